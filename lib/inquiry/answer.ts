/** Answers to questions: a verdict of a closed list, what it rests on, and what was tried. */
import type { AnyStructure } from "../carriers/any-structure.ts";
import type { Structure } from "../carriers/structure.ts";
import type { DerivationFact, Evidence } from "../evidence/format.ts";
import type { Formula } from "../logic/formula.ts";
import type { EndReason } from "../logic/meter.ts";
import type { Axiom, Theory } from "../logic/theory.ts";
import type { FinitenessReason } from "./finiteness/search.ts";

/** `derive` and claims. */
export type ClaimVerdict = "holds" | "fails" | "open";
export type FiniteVerdict =
  | "finite"
  | "infinite-only"
  | "inconsistent"
  | "no-finite-model"
  | "consistent"
  | "open";
export type CompareVerdict =
  | "equivalent"
  | "stronger"
  | "weaker"
  | "incomparable"
  | "at-least-as-strong"
  | "at-most-as-strong"
  | "open";
export type IndependenceVerdict = "independent" | "redundant" | "open";
export type DualVerdict = "equivalent" | "different" | "open";
export type Verdict = ClaimVerdict | FiniteVerdict | CompareVerdict | IndependenceVerdict | DualVerdict;

/**
 * How a search went. The sizes it has finished are certain. Beyond them it may have found a structure by looking for
 * symmetric ones; where it has not, nothing is said of those sizes.
 */
export interface Search {
  /** What was looked for, for people: "a countermodel", "a model". */
  readonly sought: string;
  /** There is none on 1, 2, …, this many points; 0 when not even one point was finished. */
  readonly noneUpTo: number;
  /**
   * The size at which one was found; null when none was. It is the smallest exactly if it is `noneUpTo + 1`; else the
   * sizes between are not settled.
   */
  readonly foundAt: number | null;
  /** Why the complete search ended before its last size; null when one was found or all sizes were finished. */
  readonly ended: EndReason | null;
  /** The size that was being searched when the complete search ended; null when it did not end early. */
  readonly endedAt: number | null;
  /**
   * Beyond `noneUpTo`, symmetric structures were looked for on up to this many points and none was met, which shows
   * nothing; null when they were not, or one was found.
   */
  readonly symmetricUpTo: number | null;
  /** Infinite carriers that were searched completely without finding one; which shows nothing about other infinite structures. */
  readonly noneOnCarriers: number;
  /**
   * Where a sentence was too deep to evaluate on an infinite carrier: how many configurations a listing would have taken,
   * infinite beyond counting. Else null.
   */
  readonly configurations: number | null;
}

/** A derivation that an answer rests on, for people to read. */
export interface ShownDerivation {
  /** What it derives, for people: "trans follows from the others", "the premises contradict each other". */
  readonly role: string;
  /** The premises that are used, with their labels, in the order of the fact's premises. */
  readonly premises: readonly Pick<Axiom, "label" | "formula">[];
  /** Null when the premises contradict each other by themselves. */
  readonly conclusion: Formula | null;
  readonly fact: DerivationFact;
}

/** Why a theory has no finite model, for people to read. */
export interface ShownReason {
  readonly reason: FinitenessReason;
  /** What the reason asks the theory for, in its order. */
  readonly obligations: readonly ShownObligation[];
}
export interface ShownObligation {
  /** What it says, for people: "it is transitive there". */
  readonly role: string;
  readonly formula: Formula;
  /** Null when it is an axiom. */
  readonly derivation: ShownDerivation | null;
}

/** How the search for a derivation went. */
export interface DerivationReport {
  /** What was to be derived, for people: "the conclusion", "a contradiction". */
  readonly sought: string;
  /**
   * `saturated`: all that follows was derived without a contradiction, so that there is no derivation; this is
   * computed, and no verdict rests on it. `ended`: the budget ended, the user interrupted, or a bound was met.
   * `stopped`: something else had settled the question.
   */
  readonly result: "derived" | "saturated" | "ended" | "stopped";
  /** Why it ended; null for the other results. */
  readonly ended: EndReason | null;
  /** Clauses generated in all. */
  readonly generated: number;
}

interface AnswerBase {
  /** Steps spent on the question. */
  readonly steps: number;
  /** Accepted by the checker; null when the verdict is `open` or nothing was established. */
  readonly evidence: Evidence | null;
}

/** `T ⊨ φ` and the other claims. */
export interface ClaimAnswer extends AnswerBase {
  readonly question: "claim";
  readonly verdict: ClaimVerdict;
  /** For people: what the structures below are, in the order found. */
  readonly structures: readonly ShownStructure[];
  readonly searches: readonly Search[];
  /** The derivations that the verdict rests on, in the order found. */
  readonly derivations: readonly ShownDerivation[];
  readonly reports: readonly DerivationReport[];
  /** Premises that contradict each other have been derived to: everything follows from them. */
  readonly inconsistent: boolean;
  /** Why there is no finite model, where the verdict rests on that; else null. */
  readonly noFinite: ShownReason | null;
  /** For `independent`: each axiom's own verdict; else null. */
  readonly axioms: readonly AxiomAnswer[] | null;
}

/** A structure that an answer rests on. */
export interface ShownStructure {
  /** What it shows, for people, as a noun phrase: "countermodel", "model of Order in which irr fails". */
  readonly role: string;
  readonly structure: AnyStructure;
}

export interface FiniteAnswer extends AnswerBase {
  readonly question: "check-finite";
  readonly verdict: FiniteVerdict;
  /** The size of a smallest model; null while smaller sizes are unsettled or no finite model is known. */
  readonly leastSize: number | null;
  /** The size of the model that is shown; null when there is none or it is infinite. */
  readonly modelSize: number | null;
  /** There is no model on 1, …, this many points. */
  readonly noModelUpTo: number;
  /** For 1, …, this many of those sizes the evidence has a clause proof; for the others it is computed. */
  readonly provenUpTo: number;
  /** A finite model, or where none is known an infinite one; null when none was found. */
  readonly model: AnyStructure | null;
  /** Why there is no finite model; null when that was not derived. */
  readonly noFinite: ShownReason | null;
  readonly search: Search;
  /** Of a contradiction; null unless `inconsistent`. */
  readonly derivation: ShownDerivation | null;
  readonly report: DerivationReport;
}

export interface ModelsAnswer extends AnswerBase {
  readonly question: "models";
  readonly verdict: null;
  readonly size: number;
  /** Pairwise not isomorphic, in the order found. */
  readonly models: readonly Structure[];
  /** Whether these are all, up to isomorphism. */
  readonly complete: boolean;
  /** Whether there are others, which are not shown; false when that is not known. */
  readonly more: boolean;
  /** Whether the evidence has a clause proof that there are none. */
  readonly provenNone: boolean;
  readonly ended: EndReason | null;
}

/** How many models a theory has on one size. A number that is there is exact; one that was not finished is null. */
export interface CountedSize {
  readonly size: number;
  /** Models on the points 1 to n, as many as there are. */
  readonly labelled: bigint | null;
  /** Classes of isomorphic models. */
  readonly unlabelled: bigint | null;
  /** One model of each class, where they were asked for; at most as many as are shown. */
  readonly representatives: readonly Structure[];
}

/** Counts are computed, not certified: `evidence` covers the representatives alone. */
export interface CountAnswer extends AnswerBase {
  readonly question: "count";
  readonly verdict: null;
  /** From 1 on; only the last one may have a number that was not finished. */
  readonly sizes: readonly CountedSize[];
  readonly ended: EndReason | null;
  /** The size that was being counted when the work ended; null when it did not end early. */
  readonly endedAt: number | null;
}

export interface AxiomAnswer {
  readonly label: string;
  readonly verdict: IndependenceVerdict;
  /** A structure where all axioms but this one hold; null unless independent. */
  readonly witness: AnyStructure | null;
  /** Of the axiom from the others; null unless redundant. */
  readonly derivation: ShownDerivation | null;
  readonly search: Search;
  readonly report: DerivationReport;
}

export interface IndependenceAnswer extends AnswerBase {
  readonly question: "independence";
  readonly verdict: null;
  readonly axioms: readonly AxiomAnswer[];
}

/** One pair of a comparison, by the numbers of the two theories in the list asked about. */
export interface PairAnswer {
  readonly left: number;
  readonly right: number;
  readonly verdict: CompareVerdict;
  /** A model of the left theory that is none of the right one; null when none is known. */
  readonly leftOnly: AnyStructure | null;
  /** A model of the right theory that is none of the left one; null when none is known. */
  readonly rightOnly: AnyStructure | null;
  /** False when a common model is known, true when it is derived that there is none, else null. */
  readonly jointlyInconsistent: boolean | null;
  readonly common: AnyStructure | null;
  /** Whether all axioms of the right theory are derived from the left one. */
  readonly leftEntailsRight: boolean;
  readonly rightEntailsLeft: boolean;
  readonly derivations: readonly ShownDerivation[];
}

export interface CompareAnswer extends AnswerBase {
  readonly question: "compare";
  readonly verdict: CompareVerdict | null;
  readonly names: readonly string[];
  readonly pairs: readonly PairAnswer[];
  /** Names of theories shown to be equivalent, together; every name occurs once. */
  readonly classes: readonly (readonly string[])[];
  /** Names of theories that are derived to contradict themselves, with the derivations. */
  readonly inconsistent: readonly { readonly name: string; readonly derivation: ShownDerivation }[];
  /** Whether the user interrupted; pairs after that were not searched. */
  readonly interrupted: boolean;
}

export interface DualAnswer extends AnswerBase {
  readonly question: "dualise";
  readonly verdict: null;
  /** The theory, its converse, its complement, and the complement of its converse, with their names. */
  readonly duals: readonly { readonly name: string; readonly theory: Theory }[];
  readonly pairs: readonly DualPair[];
  /** Whether the user interrupted; pairs after that were not searched. */
  readonly interrupted: boolean;
}

/** One pair of the four duals, by their numbers. */
export interface DualPair {
  readonly left: number;
  readonly right: number;
  readonly verdict: DualVerdict;
  /** A model of one and not the other, and which of the two it is a model of; null when none is known. */
  readonly witness: { readonly structure: AnyStructure; readonly modelOf: number } | null;
  /** Of each from the other; none unless equivalent. */
  readonly derivations: readonly ShownDerivation[];
}

/** An irredundant set of axioms from which all others follow. */
export interface MinimalSet {
  readonly labels: readonly string[];
  /** Of the axioms that are left out. */
  readonly derivations: readonly ShownDerivation[];
  /** For each label, a structure where it alone of the set fails. */
  readonly witnesses: readonly AnyStructure[];
}

export interface MinimiseAnswer extends AnswerBase {
  readonly question: "minimise";
  readonly verdict: null;
  readonly sets: readonly MinimalSet[];
  /** Whether the sets are all there are. */
  readonly complete: boolean;
  /** Sets of labels of which it is open whether the other axioms follow from them. */
  readonly open: readonly (readonly string[])[];
  readonly ended: EndReason | null;
}

export type Answer =
  | ClaimAnswer
  | FiniteAnswer
  | ModelsAnswer
  | CountAnswer
  | IndependenceAnswer
  | CompareAnswer
  | MinimiseAnswer
  | DualAnswer;

/** Told by a question while it works, for progress displays. Nothing of an answer depends on it. */
export interface Progress {
  /** For people: "models on 7 points". */
  readonly doing: string;
  readonly steps: number;
  /** Infinite for work that needs no limit. */
  readonly limit: number;
}
