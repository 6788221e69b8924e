/** What holds between the elements of a sample, and of all others: found out by the carrier, not by looking. */
import type { Structure, Table } from "../../lib/carriers/structure.ts";
import { and, atom, type Formula, forall, implies, not } from "../../lib/logic/formula.ts";
import { Meter, WorkEnded } from "../../lib/logic/meter.ts";
import { satisfies } from "../../lib/structures/evaluate.ts";
import type { Matrix } from "./order.ts";
import type { Sample } from "./samples.ts";

/** An element that is not in the sample, or many that stand to it in the same way. */
export interface Other {
  /** For each element of the sample, whether the relation holds of it and this one. */
  readonly from: readonly boolean[];
  /** The other way round. */
  readonly to: readonly boolean[];
}

export interface SampleRelation {
  readonly name: string;
  readonly matrix: Matrix;
  /** One for each way in which elements outside stand to the sample. */
  readonly others: readonly Other[];
}

/** Extensions of a sample that are listed at most. */
const MOST_OTHERS = 20_000;

/**
 * A two-place relation on a sample. By the law of extensions, what some other element is to the sample, one that the
 * carrier lists is too.
 * @returns null when there is too much to list
 */
export function relationOn({ carrier }: Structure, table: Table, sample: Sample): SampleRelation | null {
  const { configuration, elements } = sample;
  const count = elements.length;
  // Its bound is for any elements; those of the sample cut out few cells.
  const isSmall =
    carrier.description.kind === "boolean-algebra" || carrier.mostExtensions(count, 0) <= MOST_OTHERS;
  if (!isSmall) return null;
  const holds = (extended: unknown, first: number, second: number) =>
    table.holds[carrier.kindOf(extended, [first, second])] === 1;
  const places = elements.map((_, place) => place);
  const others = new Map<string, Other>();
  for (const extended of carrier.extensions(configuration, 0)) {
    if (places.some((place) => carrier.same(extended, place, count))) continue;
    const other = {
      from: places.map((place) => holds(extended, place, count)),
      to: places.map((place) => holds(extended, count, place)),
    };
    others.set(JSON.stringify(other), other);
  }
  return {
    name: table.relation.name,
    matrix: places.map((first) => places.map((second) => holds(configuration, first, second))),
    others: [...others.values()],
  };
}

/** Steps that finding out about the whole structure may cost. */
const STEPS = 300;

/** Properties of a relation in the whole structure; false also where that would take too long to find out. */
export interface WholeRelation {
  readonly isSymmetric: boolean;
  readonly isEquivalence: boolean;
  /** Irreflexive and transitive. */
  readonly isStrictOrder: boolean;
  /** Reflexive and transitive. */
  readonly isPreorder: boolean;
}

export function wholeRelation(structure: Structure, { relation }: Table): WholeRelation {
  const R = (left: string, right: string) => atom(relation, left, right);
  const isTrue = (sentence: Formula) => {
    try {
      return satisfies(structure, sentence, new Meter(STEPS));
    } catch (problem) {
      if (problem instanceof WorkEnded) return false;
      throw problem;
    }
  };
  const isSymmetric = isTrue(forall(["x", "y"], implies(R("x", "y"), R("y", "x"))));
  const isReflexive = isTrue(forall("x", R("x", "x")));
  const isIrreflexive = !isReflexive && isTrue(forall("x", not(R("x", "x"))));
  const isTransitive =
    (isReflexive || isIrreflexive) &&
    isTrue(forall(["x", "y", "z"], implies(and(R("x", "y"), R("y", "z")), R("x", "z"))));
  return {
    isSymmetric,
    isEquivalence: isReflexive && isSymmetric && isTransitive,
    isStrictOrder: isIrreflexive && isTransitive,
    isPreorder: isReflexive && isTransitive,
  };
}
