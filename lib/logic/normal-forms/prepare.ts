/** What comes before most forms. */
import type { Formula } from "../formula.ts";
import { toMiniscopedForm } from "./miniscope.ts";
import { toNegationForm } from "./negation.ts";
import type { Limits } from "./result.ts";
import { dropVacuous, simplify } from "./simplify.ts";
import type { StepRecorder } from "./steps.ts";

/** Negation normal form, simplified. */
export function toSimpleNegationForm(formula: Formula, limits: Limits, recorder: StepRecorder): Formula {
  return simplify(toNegationForm(formula, limits, recorder), recorder);
}

/** Negation normal form, simplified, without vacuous quantifiers. */
export function toTightNegationForm(formula: Formula, limits: Limits, recorder: StepRecorder): Formula {
  return simplify(dropVacuous(toSimpleNegationForm(formula, limits, recorder), recorder), recorder);
}

/** Miniscoped, simplified. */
export function toSimpleMiniscopedForm(formula: Formula, limits: Limits, recorder: StepRecorder): Formula {
  const tight = toSimpleNegationForm(formula, limits, recorder);
  return simplify(toMiniscopedForm(tight, limits, recorder), recorder);
}
