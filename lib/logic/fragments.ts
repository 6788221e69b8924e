/** Measures of sentences, and the decidable fragments that they fall into, with what is published about these. */

/** The fragments that are recognised. */
export type FragmentName =
  | "bernays-schoenfinkel-ramsey"
  | "ackermann"
  | "goedel-kalmar-schuette"
  | "two-variable"
  | "two-variable-counting"
  | "two-variable-one-transitive"
  | "monadic"
  | "maslov"
  | "aea-krom";

/** A fragment that a set of sentences falls into. */
export interface Membership {
  readonly fragment: FragmentName;
  /** For people: "Bernays–Schönfinkel–Ramsey class". */
  readonly name: string;
  /** What the sentences of the fragment look like: "∃*∀*, identity allowed". */
  readonly form: string;
  /** `finite-only`: whether there is a finite model can be decided; whether there is any is not known to be. */
  readonly decidable: "yes" | "finite-only";
  /** Whether every satisfiable sentence of the fragment has a finite model. */
  readonly finiteModelProperty: boolean;
  /** What is published on the size of models, or on complexity; null when nothing is cited. */
  readonly bound: string | null;
  /**
   * With a model, the sentences have one on at most this many points. Null where the published bound is no explicit
   * number, and where it is beyond 2^53.
   */
  readonly points: number | null;
  /** The maximal decidable prefix-vocabulary class that it belongs to; null when it is no such class. */
  readonly maximalClass: string | null;
  /** Authors and years. */
  readonly source: string;
}

/** What `describe` says of a sentence, or of a theory as the conjunction of its axioms. */
export interface SyntaxReport {
  /** The quantifier rank, as written. */
  readonly depth: number;
  /** Different variables, as written. */
  readonly variables: number;
  /** How many suffice when quantifiers are moved inwards and names are used again; at most `variables`. */
  readonly leastVariables: number;
  /** How often the kind of quantifier changes along the prefix. */
  readonly alternations: number;
  /** The prefix of a prenex form with the fewest alternations, from the left; empty without quantifiers. */
  readonly prefix: readonly PrefixBlock[];
  readonly fragments: readonly Membership[];
  /** See {@link finiteCheckBound}. */
  readonly finiteCheck: FiniteCheck | null;
}

export interface PrefixBlock {
  readonly kind: "forall" | "exists";
  /** At least 1. */
  readonly count: number;
}

/** A published bound on the size of a smallest model, as an explicit number. */
export interface FiniteCheck {
  /** The sentences have a model if and only if they have one on at most this many points; at least 1. */
  readonly points: number;
  /** Why, for people: the fragment, or how two of them are put together. */
  readonly reason: string;
  readonly source: string;
}
