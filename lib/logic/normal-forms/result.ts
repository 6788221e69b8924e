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
  /** How many times in a row; at least 1. */
  readonly times: number;
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

/** A form that was not made, since it would be too large. */
export interface Refusal {
  readonly outcome: "refused";
  readonly code: "form-too-large" | "form-too-deep";
  /** For people, with the numbers. */
  readonly message: string;
  /** What was allowed: {@link Limits.parts} or {@link Limits.levels}. */
  readonly limit: number;
  /** A form of the same formula that stays small; null when there is none. */
  readonly suggestion: NormalFormName | null;
}

/** What a form may come to before it is refused. */
export interface Limits {
  /** Subformulas of a formula, repeated ones counted each time; literals of all clauses together. */
  readonly parts: number;
  /** Connectives and quantifiers one inside another. */
  readonly levels: number;
}

/** Every recursive function in lib is safe with so many levels. */
export const DEFAULT_LIMITS: Limits = { parts: 50_000, levels: 1000 };

/** Thrown where a form is being made and gets too large; {@link normalise} makes a {@link Refusal} of it. */
export class FormTooLarge extends Error {
  readonly bound: keyof Limits;
  readonly limit: number;

  constructor(bound: keyof Limits, limit: number) {
    super(`more than ${limit} ${bound}`);
    this.bound = bound;
    this.limit = limit;
  }
}

/** What two steps keep together. */
export function weaker(left: Preservation, right: Preservation): Preservation {
  return left === "equivalent" ? right : left;
}

export type NormalFormResult<Value extends NormalFormValue = NormalFormValue> = NormalForm<Value> | Refusal;
