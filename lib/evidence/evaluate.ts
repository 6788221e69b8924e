/**
 * The checker's own evaluator: truth of a sentence in a structure by plain recursion over the carrier's
 * extensions. It shares nothing with the searches' evaluator and remembers nothing, so that it can be read at a
 * glance; it may be slower.
 */
import type { Carrier } from "../carriers/carrier.ts";
import { buildCarrier } from "../carriers/structure.ts";
import { depthOf, type Formula, type Variable } from "../logic/formula.ts";
import type { Meter } from "../logic/meter.ts";
import type { StructureRecord } from "./format.ts";
import { reject } from "./read.ts";

/**
 * @param meter counts a thousandth of a step for each subformula looked at
 * @throws Rejected when the structure does not interpret a relation of the sentence
 */
export function isTrueIn(record: StructureRecord, sentence: Formula, meter: Meter): boolean {
  const carrier: Carrier = buildCarrier(record.carrier);
  const holds = new Map(Object.entries(record.tables).map(([name, table]) => [name, new Set(table.holds)]));
  return isTrue(sentence, carrier.empty, new Map(), 0);

  /**
   * @param places where in the configuration each variable in scope stands
   * @param named how many elements the configuration has
   */
  function isTrue(
    formula: Formula,
    configuration: unknown,
    places: ReadonlyMap<Variable, number>,
    named: number,
  ): boolean {
    meter.charge(1);
    const placeOf = (variable: Variable) => places.get(variable)!;
    switch (formula.kind) {
      case "true":
        return true;
      case "false":
        return false;
      case "atom": {
        const table = record.tables[formula.relation.name];
        if (table === undefined) return reject(`the structure does not say what ${formula.relation.name} is`);
        if (table.places !== formula.args.length)
          return reject(`${formula.relation.name} has ${table.places} places in the structure`);
        return holds
          .get(formula.relation.name)!
          .has(carrier.kindOf(configuration, formula.args.map(placeOf)));
      }
      case "equal":
        return carrier.same(configuration, placeOf(formula.left), placeOf(formula.right));
      case "not":
        return !isTrue(formula.body, configuration, places, named);
      case "and":
        return formula.parts.every((part) => isTrue(part, configuration, places, named));
      case "or":
        return formula.parts.some((part) => isTrue(part, configuration, places, named));
      case "implies":
        return (
          !isTrue(formula.left, configuration, places, named) ||
          isTrue(formula.right, configuration, places, named)
        );
      case "iff":
        return (
          isTrue(formula.left, configuration, places, named) ===
          isTrue(formula.right, configuration, places, named)
        );
      case "forall":
      case "exists": {
        const inner = new Map(places).set(formula.variable, named);
        const extensions = carrier.extensions(configuration, depthOf(formula.body));
        const check = (extended: unknown) => isTrue(formula.body, extended, inner, named + 1);
        return formula.kind === "forall" ? extensions.every(check) : extensions.some(check);
      }
    }
  }
}
