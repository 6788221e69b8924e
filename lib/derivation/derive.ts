/** Derivations of a conclusion from premises, as inquiries ask for them. */
import type { DerivationFact } from "../evidence/format.ts";
import type { Formula } from "../logic/formula.ts";

export interface DerivationTask {
  /** Closed. */
  readonly premises: readonly Formula[];
  /** Closed; null to derive a contradiction. */
  readonly conclusion: Formula | null;
}

export interface Derivation {
  /** The premises that are used, by their places in the task, in ascending order. */
  readonly premises: readonly number[];
  /** Whether the negated conclusion is used; if not, the premises contradict each other. */
  readonly usesConclusion: boolean;
  /** Numbered for just these premises, and for the negated conclusion just if it is used. */
  readonly record: Pick<DerivationFact, "made" | "lines">;
}

export type TurnOutcome =
  | { readonly result: "derived"; readonly derivation: Derivation }
  /** There is no derivation: premises and negated conclusion have a model together, perhaps an infinite one. */
  | { readonly result: "saturated" }
  | { readonly result: "gave-up"; readonly reason: "steps" | "memory" | "incomplete" };
