/**
 * The checker's own evaluator: truth of a sentence in a structure by plain recursion over the carrier's
 * extensions. It shares nothing with the searches' evaluator and remembers nothing, so that it can be read at a
 * glance; it may be slower.
 */
import { buildCarrier } from "../carriers/build.ts";
import { listExtensions } from "../carriers/listing.ts";
import type { Meter } from "../logic/meter.ts";
import { atomTerms, freeVariables, partsOf } from "../logic/records/formulas.ts";
import type { FormulaRecord, StructureRecord } from "./format.ts";
import { reject } from "./read.ts";

/** Where in a configuration each variable in scope stands. */
type Places = ReadonlyMap<string, number>;

/**
 * @param sentence closed and without functions
 * @param meter counts a thousandth of a step for each subformula looked at
 * @throws Rejected when the structure does not interpret a relation of the sentence
 */
export function isTrueIn(record: StructureRecord, sentence: FormulaRecord, meter: Meter): boolean {
  const carrier = buildCarrier(record.carrier);
  const tables = new Map(
    Object.entries(record.tables).map(([name, { places, holds }]) => [
      name,
      { places, holds: new Set(holds) },
    ]),
  );
  return isTrue(sentence, carrier.empty, new Map());

  function isTrue(formula: FormulaRecord, configuration: unknown, places: Places): boolean {
    meter.charge(1);
    const part = (inner: FormulaRecord) => isTrue(inner, configuration, places);
    switch (formula[0]) {
      case "true":
        return true;
      case "false":
        return false;
      case "is":
      case "=": {
        const args = atomTerms(formula).map((variable) => places.get(variable as string)!);
        if (formula[0] === "=") return carrier.same(configuration, args[0]!, args[1]!);
        const table = tables.get(formula[1]) ?? reject(`the structure does not say what ${formula[1]} is`);
        if (table.places !== args.length) reject(`${formula[1]} has ${table.places} places in the structure`);
        return table.holds.has(carrier.kindOf(configuration, args));
      }
      case "not":
        return !part(formula[1]);
      case "and":
        return partsOf(formula).every(part);
      case "or":
        return partsOf(formula).some(part);
      case "implies":
        return !part(formula[1]) || part(formula[2]);
      case "iff":
        return part(formula[1]) === part(formula[2]);
      case "forall":
      case "exists": {
        const [kind, variable, body] = formula;
        // Only elements that are free here matter: the fewer there are, the fewer are the extensions.
        const free = freeVariables(formula);
        const own = carrier.restrict(
          configuration,
          free.map((name) => places.get(name)!),
        );
        const inner = new Map([...free, variable].map((name, place) => [name, place]));
        const extensions = listExtensions(carrier, own, free.length, depthOf(body), meter);
        const check = (extended: unknown) => isTrue(body, extended, inner);
        return kind === "forall" ? extensions.every(check) : extensions.some(check);
      }
    }
  }
}

/** How many quantifiers lie one inside another at most. */
function depthOf(formula: FormulaRecord): number {
  const inner = partsOf(formula).reduce((most, part) => Math.max(most, depthOf(part)), 0);
  return formula[0] === "forall" || formula[0] === "exists" ? inner + 1 : inner;
}
