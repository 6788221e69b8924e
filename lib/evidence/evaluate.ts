/**
 * The checker's own evaluator: truth of a sentence in a structure by plain recursion over the carrier's
 * extensions. It shares nothing with the searches' evaluator, so that it can be read at a glance; it may be slower.
 */
import { buildCarrier } from "../carriers/build.ts";
import { countKinds, listExtensions } from "../carriers/listing.ts";
import type { Meter } from "../logic/meter.ts";
import { atomTerms, freeVariables, partsOf } from "../logic/records/formulas.ts";
import { countComponents } from "../logic/structure-definition.ts";
import type { FormulaRecord, StructureRecord } from "./format.ts";
import { reject } from "./read.ts";

/** Configurations that may be listed for all quantifiers that are being gone through, and truth values remembered. */
const MOST_AT_ONCE = 1_000_000;

/** Whether a subformula is true of the elements of a configuration. */
type Test = (configuration: unknown) => boolean;

/** Variables with elements in the configuration, in their order there. */
type Scope = readonly string[];

/**
 * @param sentence closed and without functions
 * @param meter counts a thousandth of a step for each subformula looked at and for each component of each configuration listed
 * @throws Rejected when the structure is none, or does not interpret a relation of the sentence
 */
export function isTrueIn(record: StructureRecord, sentence: FormulaRecord, meter: Meter): boolean {
  return evaluatorOf(record, "the structure", meter)(sentence);
}

/**
 * The same for many sentences.
 * @param at what the structure is, for people
 * @throws Rejected when a table has kinds that there are not; and when called, as above
 */
export function evaluatorOf(
  record: StructureRecord,
  at: string,
  meter: Meter,
): (sentence: FormulaRecord) => boolean {
  const carrier = buildCarrier(record.carrier);
  const tables = new Map(
    Object.entries(record.tables).map(([name, { places, holds }]) => {
      const count = countKinds(carrier, places);
      // The kinds of points are numbered without listing them.
      if (record.carrier.kind !== "points" && count < Infinity) meter.charge(count);
      if (count === Infinity) reject(`${at}: the kinds of tuples for ${name} are too many to list`);
      if ((holds.at(-1) ?? 0) >= count) reject(`${at}: ${name} has numbers of kinds that are not kinds here`);
      return [name, { places, holds: new Set(holds) }];
    }),
  );
  const components = countComponents(record.carrier);
  let [listed, remembered] = [0, 0];
  const known = new Map<FormulaRecord, Test>();
  return (sentence) => {
    // On an infinite carrier configurations come back as soon as fewer quantifiers are to come.
    const test = known.get(sentence) ?? prepare(sentence, [], carrier.size === null);
    known.set(sentence, test);
    return test(carrier.empty);
  };

  /** @param recurs whether it may be asked again of a configuration that need not be told apart */
  function prepare(formula: FormulaRecord, scope: Scope, recurs: boolean): Test {
    const test = testOf(formula, scope, recurs);
    meter.charge(1);
    return (configuration) => {
      meter.charge(1);
      return test(configuration);
    };
  }

  function testOf(formula: FormulaRecord, scope: Scope, recurs: boolean): Test {
    switch (formula[0]) {
      case "true":
        return () => true;
      case "false":
        return () => false;
      case "is": {
        const [, name, ...variables] = formula;
        const places = variables.map((variable) => scope.indexOf(variable as string));
        const table = tables.get(name) ?? reject(`${at} does not say what ${name} is`);
        if (table.places !== places.length) reject(`${name} has ${table.places} places in ${at}`);
        return (configuration) => table.holds.has(carrier.kindOf(configuration, places));
      }
      case "=": {
        const [first, second] = atomTerms(formula).map((variable) => scope.indexOf(variable as string));
        return (configuration) => carrier.same(configuration, first!, second!);
      }
      case "forall":
      case "exists":
        return quantified(formula[0] === "forall", formula[1], formula[2], scope, recurs);
      default: {
        const parts = partsOf(formula).map((part) => prepare(part, scope, recurs));
        const [first, second] = parts;
        const of = (configuration: unknown) => (part: Test) => part(configuration);
        if (formula[0] === "not") return (configuration) => !first!(configuration);
        if (formula[0] === "and") return (configuration) => parts.every(of(configuration));
        if (formula[0] === "or") return (configuration) => parts.some(of(configuration));
        if (formula[0] === "implies")
          return (configuration) => !first!(configuration) || second!(configuration);
        return (configuration) => first!(configuration) === second!(configuration);
      }
    }
  }

  function quantified(
    isForall: boolean,
    variable: string,
    body: FormulaRecord,
    scope: Scope,
    outerRecurs: boolean,
  ): Test {
    // Only elements that are free here matter: the fewer there are, the fewer are the extensions.
    const free = freeVariables(body).filter((name) => name !== variable);
    const places = free.map((name) => scope.indexOf(name));
    const toCome = depthOf(body);
    const recurs = outerRecurs || free.length < scope.length;
    const test = prepare(body, [...free, variable], recurs);
    const memory = new Map<string | number, boolean>();
    return (configuration) => {
      const own = carrier.restrict(configuration, places);
      const key = recurs ? carrier.key(own, toCome + 1) : "";
      const before = memory.get(key);
      if (before !== undefined) return before;
      const extensions = listExtensions(carrier, own, free.length, toCome, meter);
      // Elements of carriers that are made of many others take as much more work.
      if (components > 1) meter.charge(extensions.length * (components - 1));
      listed += extensions.length;
      if (listed > MOST_AT_ONCE) meter.endForMemory();
      const result = isForall ? extensions.every(test) : extensions.some(test);
      listed -= extensions.length;
      if (recurs && remembered < MOST_AT_ONCE) {
        remembered += 1;
        memory.set(key, result);
      }
      return result;
    };
  }
}

/** Remembered, since every quantifier asks for it. */
const depths = new WeakMap<FormulaRecord, number>();

/** How many quantifiers lie one inside another at most. */
function depthOf(formula: FormulaRecord): number {
  const known = depths.get(formula);
  if (known !== undefined) return known;
  const inner = partsOf(formula).reduce((most, part) => Math.max(most, depthOf(part)), 0);
  const depth = formula[0] === "forall" || formula[0] === "exists" ? inner + 1 : inner;
  depths.set(formula, depth);
  return depth;
}
