/** Random structures of free terms for property tests. */
import fc from "fast-check";
import type { RecursionRecord, TermsRecord } from "../../lib/carriers/free-terms.ts";
import type { TermFormulaRecord, TermRecord } from "../../lib/logic/records/formulas.ts";

const CONSTRUCTORS: readonly TermsRecord["constructors"][] = [
  { c: [], f: ["x"] },
  { c: [], f: ["x", "y"] },
  { c: [], d: [], f: ["x"] },
  { c: [], f: ["x"], g: ["x", "y"] },
];

/** Structures that say where R, of two places, and where asked for P, of one, hold. */
export function termsRecords(withP: boolean): fc.Arbitrary<TermsRecord> {
  return fc.constantFrom(...CONSTRUCTORS).chain((constructors) => {
    const on = fc.constantFrom(0, 1);
    return on.chain((place) => {
      const places = new Map<string, readonly [number, number]>([["R", [2, place]]]);
      if (withP) places.set("P", [1, 0]);
      const relations = [...places].map(([name, [count, own]]) => {
        const others = count === 2 ? ["w"] : [];
        const cases = Object.entries(constructors).map(([symbol, args]) =>
          caseFormulas(name, others, args, constructors, places).map((body) => [symbol, body] as const),
        );
        return fc
          .tuple(...cases)
          .map((all) => [name, { on: own, others, cases: Object.fromEntries(all) }] as const);
      });
      return fc.tuple(...relations).map(
        (all): TermsRecord => ({
          constructors,
          relations: Object.fromEntries(all) as Record<string, RecursionRecord>,
        }),
      );
    });
  });
}

function caseFormulas(
  name: string,
  others: readonly string[],
  args: readonly string[],
  constructors: TermsRecord["constructors"],
  places: ReadonlyMap<string, readonly [number, number]>,
): fc.Arbitrary<TermFormulaRecord> {
  const constants = Object.keys(constructors).filter((symbol) => constructors[symbol]!.length === 0);
  const terms: readonly TermRecord[] = [
    ...others,
    ...args,
    ...constants.map((symbol): TermRecord => [symbol]),
  ];
  const term = fc.constantFrom(...terms);
  const truth = fc.constantFrom<TermFormulaRecord>(["true"], ["false"]);
  const equation = fc.tuple(term, term).map(([a, b]): TermFormulaRecord => ["=", a, b]);
  const atoms: fc.Arbitrary<TermFormulaRecord>[] = [];
  for (const [relation, [count, on]] of places) {
    if (args.length === 0) continue;
    atoms.push(
      fc.tuple(term, fc.constantFrom(...args)).map(([other, smaller]): TermFormulaRecord => {
        const all = count === 1 ? [smaller] : on === 0 ? [smaller, other] : [other, smaller];
        return ["is", relation, ...all];
      }),
    );
  }
  // What makes a relation go down: the other element is an argument, or related to one.
  const on = places.get(name)![1];
  const down = args.flatMap((arg): TermFormulaRecord[] =>
    others.flatMap((other): TermFormulaRecord[] => [
      ["=", other, arg],
      ["is", name, ...(on === 0 ? [arg, other] : [other, arg])],
    ]),
  );
  const leaf = fc.oneof(truth, equation, ...atoms);
  const going =
    down.length === 0
      ? fc.constant<TermFormulaRecord>(["false"])
      : fc
          .array(fc.constantFrom(...down), { minLength: 2, maxLength: 3 })
          .map((parts): TermFormulaRecord => ["or", ...parts]);
  const either = fc.tuple(fc.constantFrom("and", "or", "iff", "implies"), leaf, leaf);
  return fc.oneof(
    { weight: 2, arbitrary: leaf },
    { weight: 2, arbitrary: either.map(([kind, a, b]) => [kind, a, b] as TermFormulaRecord) },
    { weight: 1, arbitrary: leaf.map((one): TermFormulaRecord => ["not", one]) },
    { weight: 5, arbitrary: going },
    { weight: 1, arbitrary: going.map((one): TermFormulaRecord => ["not", one]) },
  );
}
