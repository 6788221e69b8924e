/** Random formulas for property tests. */
import fc from "fast-check";
import {
  and,
  atom,
  equal,
  exists,
  type Formula,
  falsum,
  forall,
  freeVariables,
  iff,
  implies,
  not,
  or,
  type RelationSymbol,
  verum,
} from "../../lib/logic/formula.ts";

/** Sentences over the given relations, at most `depth` quantifiers deep. */
export function sentences(relations: readonly RelationSymbol[], depth: number): fc.Arbitrary<Formula> {
  const names = ["x", "y", "z"];
  const variable = fc.constantFrom(...names);
  const atoms = fc
    .constantFrom(...relations)
    .chain((relation) =>
      fc
        .array(variable, { minLength: relation.places, maxLength: relation.places })
        .map((args) => atom(relation, ...args)),
    );
  const leaf = fc.oneof(
    { weight: 6, arbitrary: atoms },
    { weight: 2, arbitrary: fc.tuple(variable, variable).map(([x, y]) => equal(x, y)) },
    { weight: 1, arbitrary: fc.constantFrom<Formula>(verum, falsum) },
  );
  const formula = (left: number, size: number): fc.Arbitrary<Formula> => {
    if (size === 0) return leaf;
    const smaller = formula(left, size - 1);
    const junctions = fc.oneof(
      leaf,
      smaller.map(not),
      fc.array(smaller, { minLength: 2, maxLength: 3 }).map((parts) => and(...parts)),
      fc.array(smaller, { minLength: 2, maxLength: 3 }).map((parts) => or(...parts)),
      fc.tuple(smaller, smaller).map(([a, b]) => implies(a, b)),
      fc.tuple(smaller, smaller).map(([a, b]) => iff(a, b)),
    );
    if (left === 0) return junctions;
    const inner = formula(left - 1, size);
    return fc.oneof(
      { weight: 2, arbitrary: junctions },
      {
        weight: 3,
        arbitrary: fc
          .tuple(fc.boolean(), variable, inner)
          .map(([all, v, body]) => (all ? forall(v, body) : exists(v, body))),
      },
    );
  };
  return fc
    .tuple(formula(depth, 2), fc.tuple(fc.boolean(), fc.boolean(), fc.boolean()))
    .map(([body, choices]) =>
      freeVariables(body).reduceRight(
        (inner, v, index) => (choices[index] === true ? forall(v, inner) : exists(v, inner)),
        body,
      ),
    );
}
