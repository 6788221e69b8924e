/** What the engines of this folder take and give: clauses, and refutations of them. */
import type { ClauseRecord, TermFormulaRecord, UseRecord } from "../evidence/format.ts";

/** A clause that a refutation may start from. */
export interface InputClause {
  readonly clause: ClauseRecord;
  /** The formula in whose clause form it is, by number, and its place there. */
  readonly formula: number;
  readonly place: number;
  /** Whether the formula was made of the negated conclusion. */
  readonly goal: boolean;
}

/** What an engine is to refute. */
export interface ClauseTask {
  readonly clauses: readonly InputClause[];
  /** How many formulas there are; definitions of a refutation are numbered on from here. */
  readonly formulas: number;
}

/** A relation that an engine has brought in: ∀x … (name(x, …) ↔ body). */
export interface Definition {
  /** Occurs nowhere else. */
  readonly name: string;
  /** Distinct, and all that is free in the body. */
  readonly parameters: readonly string[];
  readonly body: TermFormulaRecord;
}

/** The last step is the clause without literals. Steps that it does not need may be among them. */
export interface Refutation {
  /** Definition d is formula number `formulas + d` of the task, as far as its functions are concerned. */
  readonly definitions: readonly Definition[];
  readonly steps: readonly RefutationStep[];
}

/** Steps go by their place in the list; each uses earlier ones. */
export type RefutationStep =
  /** An input clause as it is. */
  | { readonly from: "input"; readonly input: number }
  /** A clause of the clause form of a definition. */
  | { readonly from: "definition"; readonly definition: number; readonly place: number }
  /** True by the laws of identity, as the format of evidence says. */
  | { readonly from: "identity"; readonly clause: ClauseRecord }
  /** A consequence of earlier steps by unit propagation, as the format of evidence says. */
  | { readonly from: "inference"; readonly clause: ClauseRecord; readonly uses: readonly UseRecord[] };

export type EngineOutcome =
  | { readonly result: "refuted"; readonly refutation: Refutation }
  /** Nothing new follows and there is no contradiction: the clauses have a model. Said by complete strategies alone. */
  | { readonly result: "saturated" }
  /** A limit on the number, size or memory of clauses was met, or the strategy is not complete. */
  | { readonly result: "gave-up"; readonly reason: "steps" | "memory" | "incomplete" };
