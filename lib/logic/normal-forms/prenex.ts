/** Prenex form: all quantifiers first. */

import type { TermFormula } from "../clausal.ts";
import { join, quantifyAll, substituteTerms, termFormulaParts } from "../clausal-formulas.ts";
import {
  type Formula,
  freeVariables,
  mapParts,
  partsOf,
  substitute,
  type Variable,
  variablesOf,
} from "../formula.ts";
import { toMiniscopedForm } from "./miniscope.ts";
import { FormTooLarge, type Limits } from "./result.ts";
import { StepRecorder } from "./steps.ts";

export type QuantifierKind = "forall" | "exists";

/**
 * How many quantifiers each block of a prefix has, from the left. Blocks alternate in kind; the first may be empty.
 */
export interface Prefix {
  readonly first: QuantifierKind;
  readonly counts: readonly number[];
}

/**
 * A prenex form of a formula in negation normal form without vacuous quantifiers. Blocks are taken off from the
 * outside, each as large as it can be, beginning with ∃ or with ∀, whichever gives the fewer alternations (Egly,
 * Seidl, Tompits, Woltran & Zolda 2003); parts of a conjunction share universal variables, parts of a disjunction
 * existential ones. Quantifiers are first moved inwards where that saves an alternation.
 * @throws FormTooLarge
 */
export function toPrenexForm(formula: Formula, limits: Limits, recorder: StepRecorder): Formula {
  const miniscoped = toMiniscopedForm(formula, limits, new StepRecorder(false));
  const [asGiven, inwards] = [bestPrefix(formula), bestPrefix(miniscoped)];
  const isBetter = alternationsOf(inwards) < alternationsOf(asGiven);
  const start = isBetter ? toMiniscopedForm(formula, limits, recorder) : formula;
  return pullOut(start, isBetter ? inwards : asGiven, limits, recorder);
}

/**
 * Pulls quantifiers out in the order that {@link prefixFrom} gives for the formula.
 * @throws FormTooLarge
 */
export function pullOut(formula: Formula, order: Prefix, limits: Limits, recorder: StepRecorder): Formula {
  if (total(order) > limits.levels) throw new FormTooLarge("levels", limits.levels);
  let matrix = renameApart(formula, recorder);
  const prefix: { kind: QuantifierKind; variables: readonly Variable[] }[] = [];
  const around = (part: Formula) =>
    prefix.reduceRight((inner, { kind, variables }) => quantifyAll(kind, variables, inner), part);
  let kind = order.first;
  for (const _ of order.counts) {
    const before = matrix;
    const taken = takeOff(kind, matrix);
    matrix = taken.rest as Formula;
    prefix.push({ kind, variables: taken.variables });
    // Quantifiers that stand in front already are not moved.
    if (!isInFront(kind, before, taken.variables.length))
      recorder.noteFormula("quantifiers moved out", () => around(matrix));
    kind = otherKind(kind);
  }
  const result = around(matrix);
  recorder.endPhase("quantifiers moved out", () => ({ kind: "formula", formula: result }));
  return result;
}

export function otherKind(kind: QuantifierKind): QuantifierKind {
  return kind === "forall" ? "exists" : "forall";
}

/** Whether a formula begins with so many quantifiers of a kind. */
function isInFront(kind: QuantifierKind, formula: Formula, count: number): boolean {
  let inner = formula;
  for (let index = 0; index < count; index += 1) {
    if (inner.kind !== kind) return false;
    inner = inner.body;
  }
  return true;
}

/** The prefix with the fewest alternations, then quantifiers, of the two that {@link prefixFrom} gives. */
export function bestPrefix(formula: Formula): Prefix {
  const [exists, forall] = [prefixFrom("exists", formula), prefixFrom("forall", formula)];
  const [e, f] = [alternationsOf(exists), alternationsOf(forall)];
  if (e !== f) return e < f ? exists : forall;
  return total(forall) < total(exists) ? forall : exists;
}

function total(prefix: Prefix): number {
  return prefix.counts.reduce((sum, count) => sum + count, 0);
}

export function alternationsOf({ counts }: Prefix): number {
  return Math.max(0, counts.filter((count) => count > 0).length - 1);
}

/**
 * The prefix that comes out when every quantifier of a formula in negation normal form goes to the outermost block
 * that it can go to, the first block being of the given kind.
 */
export function prefixFrom(first: QuantifierKind, formula: Formula): Prefix {
  const counts = (part: Formula, level: number): number[] => {
    const kind = (level % 2 === 0) === (first === "forall") ? "forall" : "exists";
    if (part.kind === "forall" || part.kind === "exists") {
      const own = part.kind === kind ? level : level + 1;
      const inner = counts(part.body, own);
      while (inner.length <= own) inner.push(0);
      inner[own]! += 1;
      return inner;
    }
    const sums: number[] = [];
    for (const inner of partsOf(part).map((one) => counts(one, level)))
      for (const [block, count] of inner.entries()) {
        const isUniversal = (block % 2 === 0) === (first === "forall");
        const before = sums[block] ?? 0;
        sums[block] = isUniversal === (part.kind === "and") ? Math.max(before, count) : before + count;
      }
    return sums;
  };
  return { first, counts: counts(formula, 0) };
}

/** A block of quantifiers taken off the outside of a formula. */
export interface TakenOff {
  readonly variables: readonly Variable[];
  readonly rest: TermFormula;
}

/**
 * Takes off all quantifiers of one kind that stand in the scope of none of the other. The variables of the formula
 * must be renamed apart. Where a junction lets its parts share variables, those of the first part that has so many are kept.
 */
export function takeOff(kind: QuantifierKind, formula: TermFormula): TakenOff {
  if (formula.kind === kind) {
    const { variables, rest } = takeOff(kind, formula.body);
    return { variables: [formula.variable, ...variables], rest };
  }
  if (formula.kind !== "and" && formula.kind !== "or") return { variables: [], rest: formula };
  const taken = termFormulaParts(formula).map((part) => takeOff(kind, part));
  if (taken.every(({ variables }) => variables.length === 0)) return { variables: [], rest: formula };
  if ((kind === "forall") !== (formula.kind === "and"))
    return {
      variables: taken.flatMap(({ variables }) => variables),
      rest: join(
        formula.kind,
        taken.map(({ rest }) => rest),
      ),
    };
  const shared: Variable[] = [];
  const rest = taken.map((part) => {
    shared.push(...part.variables.slice(shared.length));
    const replacement = new Map(part.variables.map((variable, index) => [variable, shared[index]!]));
    return substituteTerms(part.rest, replacement);
  });
  return { variables: shared, rest: join(formula.kind, rest) };
}

/**
 * Renames bound variables, so that no two quantifiers have the same one and none has a free one.
 * @param taken variables that no quantifier is to have either
 */
export function renameApart(
  formula: Formula,
  recorder: StepRecorder,
  taken: ReadonlySet<Variable> = new Set(),
): Formula {
  const names = new Set([...variablesOf(formula), ...taken]);
  const used = new Set([...freeVariables(formula), ...taken]);
  const numbers = new Map<string, number>();
  const rename = (part: Formula): Formula => {
    if (part.kind !== "forall" && part.kind !== "exists") return mapParts(part, rename);
    const { kind, variable } = part;
    if (!used.has(variable)) {
      used.add(variable);
      return mapParts(part, rename);
    }
    const renamed = freshNumbered(variable, names, numbers);
    names.add(renamed);
    used.add(renamed);
    return { kind, variable: renamed, body: rename(substitute(part.body, new Map([[variable, renamed]]))) };
  };
  const result = rename(formula);
  if (numbers.size === 0) return formula;
  recorder.noteFormula("variables renamed", () => result);
  recorder.endPhase("variables renamed", () => ({ kind: "formula", formula: result }));
  return result;
}

/** A variable with the same letter that is not taken, with the least number that no earlier call has passed. */
function freshNumbered(like: Variable, taken: ReadonlySet<Variable>, numbers: Map<string, number>): Variable {
  const letter = like.slice(0, 1);
  let number = numbers.get(letter) ?? 1;
  while (taken.has(letter + number)) number += 1;
  numbers.set(letter, number + 1);
  return letter + number;
}
