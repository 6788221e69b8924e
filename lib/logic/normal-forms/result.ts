/** What a normal form comes to: the form and the steps to it, or a refusal where it would be too large. */
import type { ClauseSet, FunctionSymbol, TermFormula } from "../clausal.ts";
import type { Formula } from "../formula.ts";

/** The forms that {@link normalise} makes. */
export type NormalFormName =
  | "negation"
  | "prenex"
  | "miniscoped"
  | "skolem"
  | "clause"
  | "definitional-clause"
  | "disjunctive";

/**
 * What a form keeps. `equivalent`: true in the same structures. `equisatisfiable`: every model of the form is one of
 * the formula, and every model of the formula becomes one of the form when the added functions and relations are
 * interpreted in it suitably; so one has a model on a domain if and only if the other has.
 */
export type Preservation = "equivalent" | "equisatisfiable";

export type NormalFormValue =
  | { readonly kind: "formula"; readonly formula: Formula }
  | {
      readonly kind: "skolem";
      /** Without existential quantifiers. */
      readonly formula: TermFormula;
      /** The Skolem functions, in the order they came in. */
      readonly functions: readonly FunctionSymbol[];
    }
  | { readonly kind: "clauses"; readonly clauses: ClauseSet };

/** One step on the way to a normal form. */
export interface NormalFormStep {
  /** What was done, for people, as a short noun phrase: "implication removed". */
  readonly done: string;
  /** What holds between the value before and the value after. */
  readonly keeps: Preservation;
  readonly value: NormalFormValue;
}

export interface NormalForm<Value extends NormalFormValue = NormalFormValue> {
  readonly outcome: "done";
  /** What holds between the formula and the value; the weakest of the steps. */
  readonly keeps: Preservation;
  readonly value: Value;
  /** From the formula to the value; the last one's value is the value. None when there was nothing to do. */
  readonly steps: readonly NormalFormStep[];
}

/** A form that was not made, since it would have more parts than allowed. */
export interface Refusal {
  readonly outcome: "refused";
  readonly code: "form-too-large";
  /** For people, with the numbers. */
  readonly message: string;
  /** How many parts (subformulas, or literals of clauses) were allowed. */
  readonly limit: number;
  /** A form of the same formula that stays small; null when there is none. */
  readonly suggestion: NormalFormName | null;
}

export type NormalFormResult<Value extends NormalFormValue = NormalFormValue> = NormalForm<Value> | Refusal;
