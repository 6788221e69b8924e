/** Structures as the user writes them down, and as evidence names them: plain data, before a carrier is built. */
import type { RelationSymbol } from "./formula.ts";

/** Points that a finite domain may have. */
export const LARGEST_DOMAIN = 1_000_000;

/**
 * Entries that all tables of one structure may have together: the number of points to the power of the number of
 * places, summed over the relations.
 */
export const LARGEST_TABLES = 250_000;

/** Bounds on the numbers in descriptions of infinite carriers. */
export const LARGEST_OFFSET = 1_000;
export const MOST_COLOURS = 100;
/** Components that a carrier made of others may have, all levels together. */
export const MOST_COMPONENTS = 50;

/** A finite domain. */
export interface PointsDescription {
  readonly kind: "points";
  /** How many points; at least 1. They are called 1, 2, …, size. */
  readonly size: number;
}

/** The rational numbers in their order; with several colours, each number has one of them and each colour is dense. */
export interface DenseLineDescription {
  readonly kind: "dense-line";
  /** How many colours, at least 1. */
  readonly colours: number;
}

/** The integers. Differences y − x are told apart from −offset to offset; all larger ones are alike, so are all smaller. */
export interface IntegerLineDescription {
  readonly kind: "integer-line";
  /** At least 0: then only < and = are told apart. */
  readonly offset: number;
}

/** The natural numbers 0, 1, 2, … Differences are told apart as on the integer line. */
export interface HalfLineDescription {
  readonly kind: "half-line";
  readonly offset: number;
  /** The numbers 0, …, ends − 1 are told apart from all others by their places; with 0, none is. */
  readonly ends: number;
}

/**
 * Tagged tuples over another carrier: the elements with tag t are the tuples of `widths[t]` elements of it. So `[1, 1]`
 * is two copies, `[1, 0]` one copy and a single point, `[2]` the pairs.
 */
export interface TuplesDescription {
  readonly kind: "tuples";
  readonly over: CarrierDescription;
  /** At least one; each at least 0. */
  readonly widths: readonly number[];
}

/** The elements of several carriers side by side. Elements of different parts are told apart by the part alone. */
export interface SumDescription {
  readonly kind: "sum";
  /** At least two. */
  readonly parts: readonly CarrierDescription[];
}

/** A copy of `inner` at every element of `outer`. Elements of different copies are told apart by the places of the copies alone. */
export interface ProductDescription {
  readonly kind: "product";
  readonly outer: CarrierDescription;
  readonly inner: CarrierDescription;
}

export const GENERIC_CLASSES = ["graph", "digraph", "tournament", "partial-order"] as const;

/** The countable structure in which every finite member of the class can be found, and extended in every way. */
export interface GenericDescription {
  readonly kind: "generic";
  readonly of: (typeof GENERIC_CLASSES)[number];
}

/**
 * The countable Boolean algebra without atoms, with its least and greatest element or without; one that has its least
 * element has its greatest.
 */
export interface BooleanAlgebraDescription {
  readonly kind: "boolean-algebra";
  readonly zero: boolean;
  readonly top: boolean;
}

/** The countable dense tree that branches at each of its points into infinitely many branches: what lies below a point is a dense line. */
export interface DenseTreeDescription {
  readonly kind: "dense-tree";
}

/**
 * Every element has one parent and `branching` children; in a rooted one, one element has no parent. Two elements are
 * told apart by the steps up from the first to their nearest common ancestor and down from there to the second, where
 * together they are at most `offset`; otherwise they are far apart.
 */
export interface ForestDescription {
  readonly kind: "forest";
  /** At least 1. */
  readonly branching: number;
  readonly rooted: boolean;
  readonly offset: number;
  /** In a rooted one, the elements less than so many steps from the root are told apart by their number of steps. */
  readonly ends: number;
}

/** A domain, named. What can be said about its elements is in `lib/carriers`, one file for each kind. */
export type CarrierDescription =
  | PointsDescription
  | DenseLineDescription
  | IntegerLineDescription
  | HalfLineDescription
  | TuplesDescription
  | SumDescription
  | ProductDescription
  | GenericDescription
  | BooleanAlgebraDescription
  | DenseTreeDescription
  | ForestDescription;

/** How many carriers that are made of no others an element, or another one, may be in or have coordinates in. */
export function countComponents(description: CarrierDescription): number {
  switch (description.kind) {
    case "tuples": {
      const over = countComponents(description.over);
      return description.widths.reduce((sum, width) => sum + Math.max(1, width * over), 0);
    }
    case "sum":
      return description.parts.reduce((sum, part) => sum + countComponents(part), 0);
    case "product":
      return countComponents(description.outer) + countComponents(description.inner);
    default:
      return 1;
  }
}

/**
 * What a definition on an infinite carrier says of its elements. Variables stand for elements; where the carrier is made
 * of others, a path leads to a component: of tuples the number of the coordinate, from 1; of a product `"outer"` or
 * `"inner"`; of a sum nothing, since its elements are those of the parts.
 */
export type ElementTerm =
  | {
      readonly kind: "element";
      readonly variable: string;
      readonly path: readonly (number | "outer" | "inner")[];
    }
  /**
   * A number of the half line or the integer line; the zero and the one of a Boolean algebra; in a rooted forest an
   * element so many steps from the root (of which there may be several: `x = 1` says that x is one).
   */
  | { readonly kind: "number"; readonly value: number }
  /** So many steps further along an integer line or half line; to the left when negative. */
  | { readonly kind: "shift"; readonly of: ElementTerm; readonly by: number }
  /** `meet` of two in a dense tree or Boolean algebra, `join` of two and `co` of one there, `parent` of one in a forest. */
  | {
      readonly kind: "apply";
      readonly name: "meet" | "join" | "co" | "parent";
      readonly args: readonly ElementTerm[];
    };

export type CarrierAtom =
  | {
      readonly kind: "compare";
      readonly relation: "=" | "<" | "≤";
      readonly left: ElementTerm;
      readonly right: ElementTerm;
    }
  /** The colour of an element of a coloured line, the copy (tag) of a tuple, the part of a sum; counted from 1. */
  | {
      readonly kind: "label";
      readonly name: "colour" | "copy" | "part";
      readonly of: ElementTerm;
      readonly value: number;
    }
  /** `adjacent` in the generic graph, `arc` from one to the other in the generic digraph, `beats` in the tournament. */
  | {
      readonly kind: "holds";
      readonly name: "adjacent" | "arc" | "beats";
      readonly args: readonly ElementTerm[];
    };

/** A formula without quantifiers about elements of a carrier. */
export type CarrierFormula =
  | { readonly kind: "true" | "false" }
  | CarrierAtom
  | { readonly kind: "not"; readonly body: CarrierFormula }
  | { readonly kind: "and" | "or"; readonly parts: readonly CarrierFormula[] }
  | { readonly kind: "implies" | "iff"; readonly left: CarrierFormula; readonly right: CarrierFormula };

/** The tuples of points at which a relation holds. */
export interface ListedRelation {
  readonly relation: RelationSymbol;
  /** Points numbered from 1; each tuple as long as the relation has places. */
  readonly tuples: readonly (readonly number[])[];
}

/** A relation that holds of the elements of which a formula is true. */
export interface DefinedRelation {
  readonly relation: RelationSymbol;
  /** One for each place, no two the same. */
  readonly variables: readonly string[];
  readonly formula: CarrierFormula;
}

/** A carrier and the relations that are defined on it; other relations are undefined there. */
export type StructureDefinition =
  | { readonly carrier: PointsDescription; readonly relations: readonly ListedRelation[] }
  | {
      readonly carrier: Exclude<CarrierDescription, PointsDescription>;
      readonly relations: readonly DefinedRelation[];
    };
