/** Skolem form: existential variables replaced by functions of the universal ones they depend on. */
import type { FunctionSymbol, Term, TermFormula } from "../clausal.ts";
import {
  freeTermVariables,
  quantifyAll,
  substituteTerms,
  termFormulaParts,
  withParts,
} from "../clausal-formulas.ts";
import { type Formula, freeVariables, type Variable } from "../formula.ts";
import { renameApart, takeOff } from "./prenex.ts";
import { FormTooLarge, type Limits } from "./result.ts";
import type { StepRecorder } from "./steps.ts";
import type { SymbolNames } from "./symbols.ts";

export interface Skolemised {
  /** ∀ … ∀ before a formula without quantifiers. */
  readonly formula: TermFormula;
  readonly functions: readonly FunctionSymbol[];
}

/**
 * Skolem form (Skolem 1920) of a formula in negation normal form: ∃y φ becomes φ with f(x, …) in place of y, where x, …
 * are the variables free in ∃y φ that are not free in the whole (Andrews 1981); then the universal quantifiers are
 * moved out. The more miniscoped the formula, the fewer arguments. Every model of the result is one of the formula,
 * and a model of the formula becomes one of the result by a choice of functions.
 * @param taken variables that no quantifier of the result is to have
 * @throws FormTooLarge
 */
export function toSkolemForm(
  formula: Formula,
  names: SymbolNames,
  limits: Limits,
  recorder: StepRecorder,
  taken: ReadonlySet<Variable> = new Set(),
): Skolemised {
  const apart = renameApart(formula, recorder, taken);
  const fixed = new Set(freeVariables(formula));
  const functions: FunctionSymbol[] = [];

  const replace = (part: TermFormula, plug: (inner: TermFormula) => TermFormula): TermFormula => {
    if (part.kind === "exists") {
      const parameters = freeTermVariables(part).filter((variable) => !fixed.has(variable));
      const symbol: FunctionSymbol = {
        name: names.functionName(parameters.length),
        places: parameters.length,
        origin: { kind: "skolem", variable: part.variable, formula: part, parameters },
      };
      functions.push(symbol);
      const term: Term = { symbol, args: parameters };
      const after = substituteTerms(part.body, new Map([[part.variable, term]]));
      const known = [...functions];
      const done = `existential quantifier replaced by a ${parameters.length === 0 ? "constant" : "function"}`;
      recorder.note(done, "equisatisfiable", () => ({
        kind: "skolem",
        formula: plug(after),
        functions: known,
      }));
      return replace(after, plug);
    }
    const parts = [...termFormulaParts(part)];
    for (const [index, inner] of parts.entries())
      parts[index] = replace(inner, (one) => plug(withParts(part, parts.with(index, one))));
    return parts.length === 0 ? part : withParts(part, parts);
  };
  const universal = replace(apart, (whole) => whole);
  recorder.endPhase("existential quantifiers replaced by functions", () => ({
    kind: "skolem",
    formula: universal,
    functions,
  }));
  const { variables, rest } = takeOff("forall", universal);
  if (variables.length > limits.levels) throw new FormTooLarge("levels", limits.levels);
  const result = quantifyAll("forall", variables, rest);
  if (!isPrefixed(universal)) {
    recorder.note("quantifiers moved out", "equivalent", () => ({
      kind: "skolem",
      formula: result,
      functions,
    }));
    recorder.endPhase("quantifiers moved out", () => ({ kind: "skolem", formula: result, functions }));
  }
  return { formula: result, functions };
}

/** Whether all universal quantifiers stand in front. */
function isPrefixed(formula: TermFormula): boolean {
  let body = formula;
  while (body.kind === "forall") body = body.body;
  return takeOff("forall", body).variables.length === 0;
}

/** The formula behind its universal quantifiers. */
export function matrixOf(formula: TermFormula): TermFormula {
  let body = formula;
  while (body.kind === "forall" || body.kind === "exists") body = body.body;
  return body;
}

/** The variables of the quantifiers in front of a formula. */
export function prefixVariables(formula: TermFormula): readonly Variable[] {
  const variables: Variable[] = [];
  let body = formula;
  while (body.kind === "forall" || body.kind === "exists") {
    variables.push(body.variable);
    body = body.body;
  }
  return variables;
}
