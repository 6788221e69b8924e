/** Random principles about finite sets, for property tests: δ, φ and parameters of any form that a principle allows. */
import fc from "fast-check";
import type { CountedRelation, PrincipleRecord } from "../../lib/logic/records/finiteness.ts";
import type { FormulaRecord } from "../../lib/logic/records/formulas.ts";

/** Names that a quantifier inside may bind; some are those of elements and parameters outside. */
const BOUND = ["x", "y", "z", "w", "a"];

/** Formulas whose free variables are in `scope`. */
export function openFormulas(
  scope: readonly string[],
  relations: readonly CountedRelation[],
  identity: boolean,
  depth: number,
): fc.Arbitrary<FormulaRecord> {
  const truths = fc.constantFrom<FormulaRecord>(["true"], ["false"]);
  if (scope.length === 0 && depth === 0) return truths;
  const quantified = fc
    .constantFrom(...BOUND)
    .chain((variable) =>
      fc
        .tuple(
          fc.constantFrom("forall" as const, "exists" as const),
          openFormulas([...new Set([...scope, variable])], relations, identity, depth - 1),
        )
        .map(([kind, body]): FormulaRecord => [kind, variable, body]),
    );
  if (scope.length === 0)
    return fc.oneof({ weight: 1, arbitrary: truths }, { weight: 5, arbitrary: quantified });
  const variable = fc.constantFrom(...scope);
  const atoms = fc
    .constantFrom(...relations)
    .chain(([name, places]) =>
      fc
        .array(variable, { minLength: places, maxLength: places })
        .map((args): FormulaRecord => ["is", name, ...args]),
    );
  const equalities = fc.tuple(variable, variable).map(([x, y]): FormulaRecord => ["=", x, y]);
  const leaf = fc.oneof(
    { weight: 8, arbitrary: atoms },
    { weight: identity ? 3 : 0, arbitrary: equalities },
    { weight: 1, arbitrary: truths },
  );
  const literal = fc.oneof(
    leaf,
    leaf.map((one): FormulaRecord => ["not", one]),
  );
  const part =
    depth === 0 ? literal : fc.oneof({ weight: 2, arbitrary: literal }, { weight: 1, arbitrary: quantified });
  const several = fc.array(part, { minLength: 2, maxLength: 3 });
  return fc.oneof(
    part,
    several.map((parts): FormulaRecord => ["and", ...parts]),
    several.map((parts): FormulaRecord => ["or", ...parts]),
    fc.tuple(part, part).map(([left, right]): FormulaRecord => ["implies", left, right]),
    fc.tuple(part, part).map(([left, right]): FormulaRecord => ["iff", left, right]),
  );
}

/** Principles about some relations, by identity or by all of the relations. */
export function principles(relations: readonly CountedRelation[]): fc.Arbitrary<PrincipleRecord> {
  const shape = fc.constantFrom(
    "endless-order" as const,
    "counting" as const,
    "pairs" as const,
    "comprehension" as const,
  );
  return fc
    .tuple(shape, fc.boolean(), fc.constantFrom(0, 0, 1, 2))
    .chain(([principle, byIdentity, count]) => {
      const parameters = ["a", "b"].slice(0, count);
      const identity = principle === "endless-order" || byIdentity;
      const different = byIdentity ? ("identity" as const) : relations;
      const formulas = (own: readonly string[]) =>
        openFormulas([...own, ...parameters], relations, identity, 1);
      const common = fc.record({
        parameters: fc.constant(parameters),
        given: count === 0 ? fc.constant(null) : openFormulas(parameters, relations, true, 1),
        domain: fc.oneof(fc.constant<FormulaRecord>(["true"]), formulas(["x"])),
        relation: formulas(principle === "pairs" ? ["x", "y", "z"] : ["x", "y"]),
      });
      const numbers = fc.tuple(
        fc.integer({ min: 1, max: 3 }),
        fc.integer({ min: 1, max: 3 }),
        fc.constantFrom("fewer-predecessors" as const, "more-successors" as const),
      );
      return fc.tuple(common, fc.boolean(), numbers).map(([parts, everywhere, [one, other, spare]]) => {
        const [predecessors, successors] = [Math.min(one, other), Math.max(one, other)];
        const records: Readonly<Record<PrincipleRecord["principle"], PrincipleRecord>> = {
          "endless-order": { principle: "endless-order", ...parts, everywhere },
          counting: {
            principle: "counting",
            ...parts,
            everywhere,
            successors,
            predecessors,
            different,
            spare: predecessors < successors ? null : spare,
          },
          pairs: { principle: "pairs", ...parts, pairs: Math.min(one, 2), different },
          comprehension: { principle: "comprehension", ...parts, different },
        };
        return records[principle];
      });
    });
}
