/** Whether normal forms keep what they promise, by evaluation on all structures of a size. */
import { expect } from "vitest";
import type { TermFormula } from "../../lib/logic/clausal.ts";
import {
  and,
  atom,
  exists,
  type Formula,
  forall,
  iff,
  implies,
  not,
  or,
  partsOf,
  type RelationSymbol,
  relationsOf,
} from "../../lib/logic/formula.ts";
import { normalise } from "../../lib/logic/normal-forms/normalise.ts";
import {
  DEFAULT_LIMITS,
  type NormalFormName,
  type NormalFormValue,
  type Refusal,
} from "../../lib/logic/normal-forms/result.ts";
import { allInterpretations, type Interpretation, isTrue } from "./brute-force.ts";
import { Expansions } from "./expansions.ts";

/** The structures in which a value is true, or can be made true by a choice of what was added. */
export function truths(
  value: NormalFormValue,
  size: number,
  relations: readonly RelationSymbol[],
  structures: readonly Interpretation[],
  values: Readonly<Record<string, number>> = {},
): boolean[] {
  if (
    value.kind === "formula" &&
    relationsOf(value.formula).every(({ name }) => relations.some((r) => r.name === name))
  )
    return structures.map((structure) => isTrue(value.formula, size, structure, values));
  const expansions = new Expansions(value, size, relations, values);
  return structures.map((structure) => expansions.exist(structure));
}

function contentOf(value: NormalFormValue): unknown {
  return value.kind === "clauses" ? value.clauses : value.formula;
}

/** Quantifiers of a value one inside another, which is what evaluating it costs. */
export function reach(value: NormalFormValue): number {
  const quantifiers = (formula: TermFormula): number => {
    const parts = partsOf(formula as Formula);
    const inner = parts.reduce((most, part) => Math.max(most, quantifiers(part)), 0);
    return formula.kind === "forall" || formula.kind === "exists" ? inner + 1 : inner;
  };
  if (value.kind !== "clauses") return quantifiers(value.formula);
  const variables = value.clauses.clauses.map(({ literals }) => {
    const text = JSON.stringify(literals, (key, inner) =>
      key === "symbol" || key === "relation" ? 0 : inner,
    );
    return new Set(text.match(/"[a-z][0-9']*"/g)).size;
  });
  return Math.max(0, ...variables);
}

/**
 * Expects each form of a sentence, and each step on the way to it, to be true in the same structures of one size as the
 * sentence, added functions and relations being chosen suitably.
 * @param most values with more quantifiers one inside another are passed over
 */
export function expectKept(
  formula: Formula,
  forms: readonly NormalFormName[],
  size: number,
  relations: readonly RelationSymbol[],
  most: number,
): void {
  const structures = [...allInterpretations(size, relations)];
  const original = structures.map((structure) => isTrue(formula, size, structure));
  for (const form of forms) {
    const result = normalise(formula, form);
    if (result.outcome === "refused") throw new Error(result.message);
    const last = result.steps.at(-1);
    if (last !== undefined) expect(contentOf(last.value)).toEqual(contentOf(result.value));
    for (const [index, value] of [...result.steps.map((step) => step.value), result.value].entries()) {
      if (reach(value) > most) continue;
      const where = `${form}, step ${index + 1}: ${result.steps[index]?.done ?? "the form"}`;
      expect(truths(value, size, relations, structures), where).toEqual(original);
    }
  }
}

/** Expects each form of formulas that are nested so deeply to be made or refused. */
export function expectHandled(levels: number, forms: readonly NormalFormName[]): void {
  const R: RelationSymbol = { name: "R", places: 2, infix: false };
  const [xy, yx] = [atom(R, "x", "y"), atom(R, "y", "x")];
  const tower = (wrap: (inner: Formula, level: number) => Formula): Formula => {
    let formula: Formula = xy;
    for (let level = 1; level < levels; level += 1) formula = wrap(formula, level);
    return formula;
  };
  const towers = [
    tower(not),
    tower((inner, i) => implies(inner, atom(R, "x", `y${i}`))),
    tower((inner, i) => (i % 2 === 0 ? and(inner, xy) : or(inner, yx))),
    tower((inner, i) =>
      i % 2 === 0 ? forall(`z${i}`, inner) : exists("y", and(inner, atom(R, `z${i}`, "y"))),
    ),
    tower((inner, i) => iff(inner, atom(R, `x${i}`, "x"))),
    tower((inner, i) =>
      i % 3 === 0 ? exists("x", or(inner, xy)) : i % 3 === 1 ? not(inner) : forall("y", and(inner, yx)),
    ),
  ];
  for (const formula of towers)
    for (const form of forms) {
      const result = normalise(formula, form);
      if (result.outcome === "refused") expect(result.limit).toBe(DEFAULT_LIMITS[boundOf(result)]);
      else if (result.value.kind === "formula")
        expect(sizeOf(result.value.formula)).toBeLessThanOrEqual(DEFAULT_LIMITS.parts);
    }
}

function boundOf({ code }: Refusal): keyof typeof DEFAULT_LIMITS {
  return code === "form-too-deep" ? "levels" : "parts";
}

/** How many subformulas there are, counted by definition. */
export function sizeOf(formula: Formula): number {
  return partsOf(formula).reduce((sum, part) => sum + sizeOf(part), 1);
}
