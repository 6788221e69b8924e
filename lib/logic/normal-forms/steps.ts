/** Recording the steps of a normal form, and rewriting formulas part by part with the steps recorded. */
import { partCount, withParts } from "../clausal-formulas.ts";
import { type Formula, partsOf } from "../formula.ts";
import { type NormalFormStep, type NormalFormValue, type Preservation, weaker } from "./result.ts";

/** Steps that are recorded one by one … */
const MOST_STEPS = 200;
/** … as long as their values have at most so many parts together. Later ones are recorded once for each phase. */
const MOST_STEP_PARTS = 200_000;

/**
 * Collects the steps of a form. Rules that are applied several times in a row are one step; for large formulas a
 * whole phase is.
 */
export class StepRecorder {
  readonly steps: NormalFormStep[] = [];
  /** What holds between the formula and the last value. */
  keeps: Preservation = "equivalent";
  #parts = 0;
  /** What the steps of this phase that have been left out keep together; null when there are none. */
  #leftOut: Preservation | null = null;
  readonly #recording: boolean;

  /** @param recording false for one that only keeps track of what the steps keep */
  constructor(recording = true) {
    this.#recording = recording;
  }

  /** @param value called only when the step is recorded */
  note(done: string, keeps: Preservation, value: () => NormalFormValue): void {
    this.keeps = weaker(this.keeps, keeps);
    if (!this.#recording) return;
    if (this.steps.length >= MOST_STEPS || this.#parts > MOST_STEP_PARTS) {
      this.#leftOut = weaker(this.#leftOut ?? "equivalent", keeps);
      return;
    }
    this.#add(done, keeps, value());
  }

  /** As {@link note}, for an equivalence between formulas. */
  noteFormula(done: string, formula: () => Formula): void {
    this.note(done, "equivalent", () => ({ kind: "formula", formula: formula() }));
  }

  /** Ends a phase: steps that were left out of it are recorded as one. */
  endPhase(done: string, value: () => NormalFormValue): void {
    if (this.#leftOut === null) return;
    this.#add(done, this.#leftOut, value());
    this.#leftOut = null;
  }

  #add(done: string, keeps: Preservation, value: NormalFormValue): void {
    const last = this.steps.at(-1);
    if (last?.done === done)
      this.steps[this.steps.length - 1] = { done, times: last.times + 1, keeps, value };
    else this.steps.push({ done, times: 1, keeps, value });
    this.#parts += value.kind === "clauses" ? value.clauses.clauses.length : partCount(value.formula);
  }
}

/** Puts a part back into the formula that it is a part of, as far as that has been rewritten. */
export type Plug = (part: Formula) => Formula;

/** A rule: what was done and what a formula becomes; null where the rule does not apply. */
export type Rule = (formula: Formula) => { readonly done: string; readonly formula: Formula } | null;

/** Rewrites the immediate subformulas from left to right. */
export function rewriteParts(
  formula: Formula,
  plug: Plug,
  rewrite: (part: Formula, plug: Plug) => Formula,
): Formula {
  const parts = [...partsOf(formula)];
  let changed = false;
  for (const [index, part] of partsOf(formula).entries()) {
    const after = rewrite(part, (inner) => plug(withParts<Formula>(formula, parts.with(index, inner))));
    if (after !== part) changed = true;
    parts[index] = after;
  }
  return changed ? withParts<Formula>(formula, parts) : formula;
}

/** Applies a rule as often as it can be, to a formula before its parts. */
export function rewriteDownwards(formula: Formula, rule: Rule, plug: Plug, recorder: StepRecorder): Formula {
  let current = formula;
  for (let step = rule(current); step !== null; step = rule(current)) {
    current = step.formula;
    const after = current;
    recorder.noteFormula(step.done, () => plug(after));
  }
  return rewriteParts(current, plug, (part, inner) => rewriteDownwards(part, rule, inner, recorder));
}

/** Applies a rule as often as it can be, to the parts before the formula. What it makes of a part needs no rewriting. */
export function rewriteUpwards(formula: Formula, rule: Rule, plug: Plug, recorder: StepRecorder): Formula {
  let current = rewriteParts(formula, plug, (part, inner) => rewriteUpwards(part, rule, inner, recorder));
  for (let step = rule(current); step !== null; step = rule(current)) {
    current = step.formula;
    const after = current;
    recorder.noteFormula(step.done, () => plug(after));
  }
  return current;
}
