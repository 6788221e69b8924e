/** Disjunctive normal form: a prefix of quantifiers, then a disjunction of conjunctions of literals. */
import { formulaOfLiteral, join, partCount } from "../clausal-formulas.ts";
import type { Formula } from "../formula.ts";
import { distribute, isDistributed } from "./distribute.ts";
import { toPrenexForm } from "./prenex.ts";
import { toTightNegationForm } from "./prepare.ts";
import { FormTooLarge, type Limits } from "./result.ts";
import { dropVacuous } from "./simplify.ts";
import { matrixOf } from "./skolem.ts";
import type { StepRecorder } from "./steps.ts";

/**
 * The prenex form with ∧ distributed over ∨ behind the prefix (Boole 1854; Post 1921). Conjunctions with a literal and
 * its negation are left out, and those that include another.
 * @throws FormTooLarge when there would be more literals than allowed
 */
export function toDisjunctiveForm(formula: Formula, limits: Limits, recorder: StepRecorder): Formula {
  const prenex = toPrenexForm(toTightNegationForm(formula, limits, recorder), limits, recorder);
  const matrix = matrixOf(prenex);
  const sets = distribute("or", matrix, limits);
  if (isDistributed("or", matrix, sets)) return prenex;
  const disjunction = join(
    "or",
    sets.map((literals) => join("and", literals.map(formulaOfLiteral))),
    // Without functions in the matrix there are none in what is made of its literals.
  ) as Formula;
  if (partCount(disjunction) > limits.parts) throw new FormTooLarge("parts", limits.parts);
  const rebuild = (part: Formula): Formula =>
    part.kind === "forall" || part.kind === "exists" ? { ...part, body: rebuild(part.body) } : disjunction;
  const result = rebuild(prenex);
  recorder.noteFormula("conjunctions distributed", () => result);
  recorder.endPhase("conjunctions distributed", () => ({ kind: "formula", formula: result }));
  return dropVacuous(result, recorder);
}
