/** Normal forms by name. */
import type { ClauseSet } from "../clausal.ts";
import { nestingOf, partCount } from "../clausal-formulas.ts";
import type { Formula } from "../formula.ts";
import { toClauses } from "./clauses.ts";
import { toDisjunctiveForm } from "./disjunctive.ts";
import { toPrenexForm } from "./prenex.ts";
import { toSimpleMiniscopedForm, toSimpleNegationForm, toTightNegationForm } from "./prepare.ts";
import {
  DEFAULT_LIMITS,
  FormTooLarge,
  type Limits,
  type NormalFormName,
  type NormalFormResult,
  type NormalFormValue,
  type Refusal,
} from "./result.ts";
import { toSkolemForm } from "./skolem.ts";
import { StepRecorder } from "./steps.ts";
import { SymbolNames } from "./symbols.ts";

/** What each form is called in sentences for people. */
export const NORMAL_FORM_NAMES: Readonly<Record<NormalFormName, string>> = {
  negation: "negation normal form",
  prenex: "prenex form",
  miniscoped: "miniscoped form",
  skolem: "Skolem form",
  clause: "clause form",
  "definitional-clause": "definitional clause form",
  disjunctive: "disjunctive form",
};

/**
 * Brings a formula to a normal form, or refuses where that would be too large. Free variables are kept: what is said
 * of the form holds for each value of them. The same formula gives the same form and steps.
 */
export function normalise(
  formula: Formula,
  form: NormalFormName,
  limits: Limits = DEFAULT_LIMITS,
): NormalFormResult {
  const recorder = new StepRecorder();
  return refusing(form, limits, () => {
    if (partCount(formula) > limits.parts) throw new FormTooLarge("parts", limits.parts);
    const value = make(formula, form, limits, recorder);
    checkSize(value, limits);
    return { outcome: "done", keeps: recorder.keeps, value, steps: recorder.steps };
  });
}

/**
 * The clauses of several formulas together, such as the axioms of a theory: symbols that are added differ throughout,
 * and each clause says which formula it comes from.
 */
export function clausesOf(
  formulas: readonly Formula[],
  form: "clause" | "definitional-clause",
  limits: Limits = DEFAULT_LIMITS,
): NormalFormResult<NormalFormValue & { kind: "clauses" }> {
  const recorder = new StepRecorder(false);
  return refusing(form, limits, () => {
    const clauses = toClauses(formulas, form === "definitional-clause", limits, recorder);
    return { outcome: "done", keeps: recorder.keeps, value: { kind: "clauses", clauses }, steps: [] };
  });
}

function make(
  formula: Formula,
  form: NormalFormName,
  limits: Limits,
  recorder: StepRecorder,
): NormalFormValue {
  switch (form) {
    case "negation":
      return { kind: "formula", formula: toSimpleNegationForm(formula, limits, recorder) };
    case "prenex":
      return {
        kind: "formula",
        formula: toPrenexForm(toTightNegationForm(formula, limits, recorder), limits, recorder),
      };
    case "miniscoped":
      return { kind: "formula", formula: toSimpleMiniscopedForm(formula, limits, recorder) };
    case "disjunctive":
      return { kind: "formula", formula: toDisjunctiveForm(formula, limits, recorder) };
    case "skolem": {
      const miniscoped = toSimpleMiniscopedForm(formula, limits, recorder);
      return { kind: "skolem", ...toSkolemForm(miniscoped, new SymbolNames([formula]), limits, recorder) };
    }
    case "clause":
    case "definitional-clause": {
      const clauses: ClauseSet = toClauses([formula], form === "definitional-clause", limits, recorder);
      return { kind: "clauses", clauses };
    }
  }
}

function checkSize(value: NormalFormValue, limits: Limits): void {
  if (value.kind === "clauses") return;
  if (partCount(value.formula) > limits.parts) throw new FormTooLarge("parts", limits.parts);
  if (nestingOf(value.formula) > limits.levels) throw new FormTooLarge("levels", limits.levels);
}

/** Forms to suggest where one is refused: the clause form that stays small. */
const SUGGESTIONS: Partial<Readonly<Record<NormalFormName, NormalFormName>>> = {
  clause: "definitional-clause",
  disjunctive: "definitional-clause",
  negation: "definitional-clause",
  miniscoped: "definitional-clause",
  prenex: "definitional-clause",
  skolem: "definitional-clause",
};

function refusing<Value extends NormalFormValue>(
  form: NormalFormName,
  limits: Limits,
  work: () => NormalFormResult<Value>,
): NormalFormResult<Value> {
  try {
    return work();
  } catch (problem) {
    if (!(problem instanceof FormTooLarge)) throw problem;
    return refusal(form, problem, limits);
  }
}

function refusal(form: NormalFormName, { bound }: FormTooLarge, limits: Limits): Refusal {
  const name = NORMAL_FORM_NAMES[form];
  const what = bound === "parts" ? "parts" : "connectives and quantifiers one inside another";
  return {
    outcome: "refused",
    code: bound === "parts" ? "form-too-large" : "form-too-deep",
    message: `the ${name} would have more than ${limits[bound]} ${what}`,
    limit: limits[bound],
    suggestion: SUGGESTIONS[form] ?? null,
  };
}
