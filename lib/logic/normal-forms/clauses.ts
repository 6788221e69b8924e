/** Clauses: conjunctions of disjunctions of literals, all variables universal. */
import type { Clause, ClauseSet, DefinedRelation, FunctionSymbol, Literal, Term } from "../clausal.ts";
import { formulaOfLiteral, join, quantifyAll, substituteTerms } from "../clausal-formulas.ts";
import { type Formula, freeVariables, type Variable } from "../formula.ts";
import { nameParts } from "./definitional.ts";
import { distribute, isDistributed } from "./distribute.ts";
import { toSimpleMiniscopedForm } from "./prepare.ts";
import { FormTooLarge, type Limits } from "./result.ts";
import { matrixOf, prefixVariables, toSkolemForm } from "./skolem.ts";
import type { StepRecorder } from "./steps.ts";
import { SymbolNames } from "./symbols.ts";

/**
 * Clauses of the conjunction of some formulas: negation normal form, miniscoped, Skolem form, and ∨ distributed over ∧
 * (Davis & Putnam 1960). In the definitional form parts are first given names, so that little is left to distribute;
 * see {@link nameParts}. Free variables are fixed: one that is free in several formulas is the same in all of them,
 * and becomes a constant.
 * @param isDefinitional whether parts get names
 * @param recorder its steps have a meaning only where there is one formula
 * @throws FormTooLarge when there would be more literals than allowed
 */
export function toClauses(
  formulas: readonly Formula[],
  isDefinitional: boolean,
  limits: Limits,
  recorder: StepRecorder,
): ClauseSet {
  const names = new SymbolNames(formulas);
  const constants = parameterConstants(formulas);
  const taken = new Set(constants.keys());
  const replacement = new Map<Variable, Term>(
    [...constants].map(([variable, symbol]) => [variable, { symbol, args: [] }]),
  );
  const clauses: Clause[] = [];
  const functions: FunctionSymbol[] = [...constants.values()];
  const definitions: DefinedRelation[] = [];
  let count = 0;
  for (const [source, formula] of formulas.entries()) {
    const named = isDefinitional
      ? nameParts(formula, names, taken, limits, recorder)
      : { formula: toSimpleMiniscopedForm(formula, limits, recorder), definitions: [] };
    const skolem = toSkolemForm(named.formula, names, limits, recorder, taken);
    const matrix = matrixOf(skolem.formula);
    const distributed = distribute("and", matrix, limits);
    if (!isDistributed("and", matrix, distributed))
      recorder.note("disjunctions distributed", "equivalent", () => ({
        kind: "skolem",
        formula: quantifyAll("forall", prefixVariables(skolem.formula), conjunctionOf(distributed)),
        functions: skolem.functions,
      }));
    for (const literals of distributed) {
      count += literals.length;
      if (count > limits.parts) throw new FormTooLarge("parts", limits.parts);
      clauses.push({ literals: literals.map((literal) => fixParameters(literal, replacement)), source });
    }
    functions.push(...skolem.functions);
    definitions.push(...named.definitions);
  }
  const result: ClauseSet = { clauses, functions, definitions };
  recorder.note("clauses read off", "equivalent", () => ({ kind: "clauses", clauses: result }));
  recorder.endPhase("clauses read off", () => ({ kind: "clauses", clauses: result }));
  return result;
}

function parameterConstants(formulas: readonly Formula[]): ReadonlyMap<Variable, FunctionSymbol> {
  const variables = [...new Set(formulas.flatMap(freeVariables))].sort();
  return new Map(
    variables.map((variable) => [
      variable,
      { name: variable, places: 0, origin: { kind: "parameter", variable } },
    ]),
  );
}

function conjunctionOf(sets: readonly (readonly Literal[])[]) {
  return join(
    "and",
    sets.map((literals) => join("or", literals.map(formulaOfLiteral))),
  );
}

function fixParameters(literal: Literal, replacement: ReadonlyMap<Variable, Term>): Literal {
  if (replacement.size === 0) return literal;
  return { positive: literal.positive, atom: substituteTerms(literal.atom, replacement) as Literal["atom"] };
}
