/**
 * The steps of a derivation as a person would take them. A derivation is made for a checker: instances, laws of
 * identity and every single resolution are lines of their own there, or a dozen lines are put together at once. Here
 * steps that are needed once and say little are drawn into the step that needs them, and steps that cite much are taken
 * apart. The derivation's clauses are not changed by that, and each clause follows from the ones that are cited for it as
 * the format of evidence demands.
 */

import type { ClauseRecord, LineRecord, TermFormulaRecord, TermRecord } from "../../lib/evidence/format.ts";
import { clauseForm } from "../../lib/logic/records/clause-form.ts";
import {
  atomOf,
  atomTerms,
  substituteInClause,
  substituteInTerm,
  termVariables,
} from "../../lib/logic/records/formulas.ts";
import { atomKey, isNegated, propagate, stepsBetween } from "./derivation-propagation.ts";

export type Terms = ReadonlyMap<string, TermRecord>;

/** A clause of the derivation, and how it came about. */
export interface Step {
  readonly clause: ClauseRecord;
  readonly origin:
    | { readonly kind: "clause"; readonly formula: number; readonly place: number }
    | { readonly kind: "identity" }
    | { readonly kind: "infer"; readonly uses: readonly Use[] };
}

/** An earlier step, and what stands in it for its variables; those that are not mentioned stay. */
export interface Use {
  readonly step: number;
  readonly terms: Terms;
}

/** By the number of the line in the derivation; a line that is not shown has no step. */
export type Steps = ReadonlyMap<number, Step>;

/** Lines that one shown step may cite, and how many of them for special values of their variables. */
const MOST_CITED = 4;
const MOST_SPECIAL = 2;
/** Lines that one step may cite before it is taken apart. */
const MOST_CITED_AT_ONCE = 5;
/** The same where equals are exchanged: what they are exchanged in, and the equation. */
const MOST_CITED_WITH_LAW = 2;

/**
 * @param formulas all formulas of the derivation, by number
 * @returns the steps to show, and the laws of identity and clauses that they cite, in order
 */
export function stepsOf(lines: readonly LineRecord[], formulas: readonly TermFormulaRecord[]): Steps {
  const steps = needed(readSteps(lines, formulas));
  const often = countUses(steps);
  for (const [number, step] of steps) {
    if (step.origin.kind !== "infer") continue;
    const drawn = drawIn(number, step.clause, step.origin.uses, steps, often);
    steps.set(number, { clause: step.clause, origin: { kind: "infer", uses: drawn } });
  }
  const drawn = needed(steps);
  return new Map([...drawn].flatMap(([number, step]) => takeApart(number, step, drawn)));
}

function readSteps(lines: readonly LineRecord[], formulas: readonly TermFormulaRecord[]): Map<number, Step> {
  const forms = new Map<number, readonly ClauseRecord[]>();
  const clauseOf = (formula: number, place: number): ClauseRecord => {
    const form = forms.get(formula) ?? clauseForm(formulas[formula]!, formula);
    forms.set(formula, form);
    return form[place]!;
  };
  const obvious = new Set(
    lines.flatMap((line, number) => (line[0] === "identity" && isObvious(line[1]) ? [number] : [])),
  );
  const stepOf = (line: LineRecord): Step => {
    switch (line[0]) {
      case "clause": {
        const [, formula, place] = line;
        return { clause: clauseOf(formula, place), origin: { kind: "clause", formula, place } };
      }
      case "identity":
        return { clause: line[1], origin: { kind: "identity" } };
      case "infer": {
        const uses = line[2]
          .filter(([step]) => !obvious.has(step))
          .map(([step, terms]) => ({ step, terms: new Map(Object.entries(terms)) }));
        return { clause: line[1], origin: { kind: "infer", uses } };
      }
    }
  };
  return new Map(lines.map((line, number) => [number, stepOf(line)]));
}

function usesOf(step: Step): readonly Use[] {
  return step.origin.kind === "infer" ? step.origin.uses : [];
}

/** What the last step needs, in order. */
function needed(steps: Steps): Map<number, Step> {
  const last = [...steps.keys()].reduce((most, number) => Math.max(most, number), 0);
  const reached = new Set([last]);
  for (const number of [...steps.keys()].sort((a, b) => b - a))
    if (reached.has(number)) for (const use of usesOf(steps.get(number)!)) reached.add(use.step);
  return new Map([...steps].filter(([number]) => reached.has(number)));
}

/**
 * The uses of a step, with steps that are used nowhere else replaced by what they use themselves, as long as the
 * step reads well.
 */
function drawIn(
  number: number,
  clause: ClauseRecord,
  uses: readonly Use[],
  steps: Steps,
  often: ReadonlyMap<number, number>,
): readonly Use[] {
  let current = uses;
  for (let at = 0; at < current.length; ) {
    const use = current[at]!;
    const inner = steps.get(use.step)!;
    if (inner.origin.kind === "infer" && (isInstance(inner, steps) || often.get(use.step) === 1)) {
      const fresh = `${number}.${at}`;
      const joined = withoutRepeats([
        ...current.slice(0, at),
        ...inner.origin.uses.map((one) => compose(one, inner.clause, use.terms, steps, fresh)),
        ...current.slice(at + 1),
      ]);
      if (readsWell(clause, joined, steps) && propagate(clause, instancesOf(joined, steps)) !== null) {
        current = joined;
        continue;
      }
    }
    at += 1;
  }
  return current;
}

/** How often each step is used. Steps that become unnecessary are still counted as uses of others. */
function countUses(steps: Steps): ReadonlyMap<number, number> {
  const often = new Map<number, number>();
  for (const step of steps.values())
    for (const use of usesOf(step)) often.set(use.step, (often.get(use.step) ?? 0) + 1);
  return often;
}

/** Whether a step says only what another one says with other variables. */
function isInstance({ origin, clause }: Step, steps: Steps): boolean {
  if (origin.kind !== "infer" || origin.uses.length !== 1) return false;
  const [use] = origin.uses as [Use];
  return isRenaming(use, steps) && clause.length === steps.get(use.step)!.clause.length;
}

/** Whether a use says what its step says, up to names of variables. */
function isRenaming({ step, terms }: Use, steps: Steps): boolean {
  const values = variablesOf(steps.get(step)!.clause).map((variable) => terms.get(variable) ?? variable);
  return values.every((value) => typeof value === "string") && new Set(values).size === values.length;
}

/** What a use of a step comes to for one of the step's own uses. */
function compose(inner: Use, clause: ClauseRecord, outer: Terms, steps: Steps, fresh: string): Use {
  const own = new Set(variablesOf(clause));
  const terms = new Map<string, TermRecord>();
  for (const variable of variablesOf(steps.get(inner.step)!.clause)) {
    const value = inner.terms.get(variable) ?? variable;
    const names = new Map<string, TermRecord>(
      termVariables(value).map((name) => [
        name,
        own.has(name) ? (outer.get(name) ?? name) : `${name} ${fresh}`,
      ]),
    );
    terms.set(variable, substituteInTerm(value, names));
  }
  return { step: inner.step, terms };
}

function withoutRepeats(uses: readonly Use[]): readonly Use[] {
  const seen = new Set<string>();
  return uses.filter(({ step, terms }) => {
    const key = JSON.stringify([step, [...terms].sort(([a], [b]) => (a < b ? -1 : 1))]);
    if (seen.has(key)) return false;
    seen.add(key);
    return true;
  });
}

/** One rule at most, and a few facts to apply it to; a contradiction is one of facts. */
function readsWell(clause: ClauseRecord, uses: readonly Use[], steps: Steps): boolean {
  const cited = uses.filter(({ step }) => steps.get(step)!.origin.kind !== "identity");
  const laws = uses.length - cited.length;
  const rules = cited.filter(({ step }) => steps.get(step)!.clause.length > 1);
  const special = cited.filter((use) => !isRenaming(use, steps));
  return (
    laws <= 1 &&
    cited.length <= (laws === 0 ? MOST_CITED : MOST_CITED_WITH_LAW) &&
    rules.length <= (clause.length === 0 ? 0 : 1) &&
    special.length <= MOST_SPECIAL
  );
}

function instancesOf(uses: readonly Use[], steps: Steps): readonly ClauseRecord[] {
  return uses.map((use) => instanceOf(use, steps));
}

/**
 * A step that cites much, after the steps that come between; any other step by itself. Those that come between have
 * numbers below that of the step and above all before it.
 */
function takeApart(number: number, step: Step, steps: Steps): readonly (readonly [number, Step])[] {
  const uses = usesOf(step);
  const cited = uses.filter((use) => steps.get(use.step)!.origin.kind !== "identity");
  const special = cited.filter((use) => !isRenaming(use, steps));
  if (cited.length <= MOST_CITED_AT_ONCE && special.length <= MOST_SPECIAL) return [[number, step]];
  const between = stepsBetween(step.clause, instancesOf(uses, steps));
  if (between === null) return [[number, step]];
  const numberOf = (place: number) => number - 1 + (place + 1) / between.length;
  return between.map(({ clause, from }, place): readonly [number, Step] => [
    numberOf(place),
    {
      clause,
      origin: {
        kind: "infer",
        uses: from.map((source) =>
          source.kind === "given" ? uses[source.place]! : { step: numberOf(source.place), terms: new Map() },
        ),
      },
    },
  ]);
}

/** What a use says. */
export function instanceOf({ step, terms }: Use, steps: Steps): ClauseRecord {
  return substituteInClause(steps.get(step)!.clause, terms);
}

/** Whether a law of identity says only that everything is itself, or that an equation may be turned round. */
function isObvious(clause: ClauseRecord): boolean {
  const [first, second] = clause;
  if (first === undefined) return false;
  if (second === undefined) return true;
  return clause.length === 2 && isNegated(first) !== isNegated(second) && atomKey(first) === atomKey(second);
}

/** Each once, in the order they occur. */
export function variablesOf(clause: ClauseRecord): readonly string[] {
  return [...new Set(clause.flatMap((literal) => atomTerms(atomOf(literal)).flatMap(termVariables)))];
}
