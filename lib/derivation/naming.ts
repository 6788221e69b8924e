/**
 * Names for parts of formulas: a fresh relation in place of a part, so that clause forms stay small or a formula shows
 * its propositional structure. Each name comes with a definition, from which the formula can be had back.
 */

import type { TermFormulaRecord } from "../evidence/format.ts";
import { freeVariables } from "../logic/records/formulas.ts";

/** The part for which a relation was put, and the formula after that. */
export interface NamedPart {
  readonly name: string;
  /** All that is free in the body. */
  readonly parameters: readonly string[];
  readonly body: TermFormulaRecord;
  /** The formula with `name(parameters)` in place of the body; names given before are in it too. */
  readonly result: TermFormulaRecord;
  /** Whether the part stands where its truth, and where its falsity, helps the formula to be true. */
  readonly positive: boolean;
  readonly negative: boolean;
}

/** 1 where truth of a part helps the whole, −1 where it harms, 0 where both matter. */
type Polarity = 1 | 0 | -1;

/** Where a part is in a formula: at which places of the nested lists. */
type Path = readonly number[];

/**
 * Names parts until no disjunction gives more clauses than `mostClauses`, as far as that can be reached (Tseitin 1968;
 * which parts: Nonnengart & Weidenbach 2001). Parts inside come before those around them.
 * @param freshName gives relations that occur nowhere
 */
export function nameLargeParts(
  formula: TermFormulaRecord,
  mostClauses: number,
  freshName: () => string,
): readonly NamedPart[] {
  const named: NamedPart[] = [];
  let whole = formula;
  shrink(formula, 1, []);
  return named;

  /** Names what has to be named in a part. */
  function shrink(part: TermFormulaRecord, polarity: Polarity, path: Path): void {
    for (const inner of innerParts(part))
      shrink(inner.part, polarityAt(part, inner.place, polarity), [...path, inner.place]);
    let now = at(whole, path);
    while (isProduct(now, polarity) && size(now, polarity) > mostClauses) {
      const largest = largestPart(now, polarity);
      if (largest === null) break;
      giveName([...path, largest], polarityAt(now, largest, polarity));
      now = at(whole, path);
    }
  }

  function giveName(path: Path, polarity: Polarity): void {
    const body = at(whole, path);
    const parameters = freeVariables(body);
    const name = freshName();
    whole = put(whole, path, ["is", name, ...parameters]);
    named.push({
      name,
      parameters,
      body,
      result: whole,
      positive: polarity >= 0,
      negative: polarity <= 0,
    });
  }
}

/**
 * Names the closed quantified parts of a closed formula that are in no other such part.
 * @param names the names by the texts of the parts, see {@link textUpToRenaming}; new ones are added
 */
export function nameClosedParts(
  formula: TermFormulaRecord,
  names: Map<string, string>,
  freshName: () => string,
): readonly NamedPart[] {
  const named = new Map<string, NamedPart>();
  let whole = formula;
  for (const path of closedParts(formula)) {
    const body = at(formula, path);
    const text = textUpToRenaming(body);
    const name = names.get(text) ?? freshName();
    names.set(text, name);
    whole = put(whole, path, ["is", name]);
    named.set(text, { name, parameters: [], body, result: whole, positive: true, negative: true });
  }
  return [...named.values()];
}

/** Where the outermost quantified parts are. */
function closedParts(formula: TermFormulaRecord, path: Path = []): readonly Path[] {
  if (formula[0] === "forall" || formula[0] === "exists") return [path];
  return innerParts(formula).flatMap(({ part, place }) => closedParts(part, [...path, place]));
}

/** A text that two formulas share exactly when they are the same up to the names of bound variables. */
export function textUpToRenaming(formula: TermFormulaRecord): string {
  const text = (part: TermFormulaRecord, bound: readonly string[]): unknown => {
    switch (part[0]) {
      case "is":
      case "=":
        return part.map((entry, place) =>
          place === 0 || (place === 1 && part[0] === "is") ? entry : termText(entry, bound),
        );
      case "forall":
      case "exists":
        return [part[0], text(part[2], [part[1], ...bound])];
      default:
        return [part[0], ...innerParts(part).map((inner) => text(inner.part, bound))];
    }
  };
  const termText = (term: unknown, bound: readonly string[]): unknown => {
    if (typeof term !== "string") {
      const [name, ...args] = term as [string, ...unknown[]];
      return [name, ...args.map((arg) => termText(arg, bound))];
    }
    const depth = bound.indexOf(term);
    return depth < 0 ? term : depth;
  };
  return JSON.stringify(text(formula, []));
}

function innerParts(formula: TermFormulaRecord): readonly { part: TermFormulaRecord; place: number }[] {
  switch (formula[0]) {
    case "not":
      return [{ part: formula[1], place: 1 }];
    case "forall":
    case "exists":
      return [{ part: formula[2], place: 2 }];
    case "and":
    case "or":
    case "implies":
    case "iff":
      return (formula.slice(1) as TermFormulaRecord[]).map((part, index) => ({ part, place: index + 1 }));
    default:
      return [];
  }
}

function at(formula: TermFormulaRecord, path: Path): TermFormulaRecord {
  return path.reduce<TermFormulaRecord>((part, place) => part[place] as TermFormulaRecord, formula);
}

function put(formula: TermFormulaRecord, path: Path, part: TermFormulaRecord): TermFormulaRecord {
  const [place, ...rest] = path;
  if (place === undefined) return part;
  const changed = [...formula];
  changed[place] = put(formula[place] as TermFormulaRecord, rest, part);
  return changed as unknown as TermFormulaRecord;
}

function polarityAt(formula: TermFormulaRecord, place: number, polarity: Polarity): Polarity {
  if (formula[0] === "iff") return 0;
  return formula[0] === "not" || (formula[0] === "implies" && place === 1) ? negated(polarity) : polarity;
}

function negated(polarity: Polarity): Polarity {
  return polarity === 0 ? 0 : polarity === 1 ? -1 : 1;
}

/** Whether the clauses are combinations of those of the parts. */
function isProduct(formula: TermFormulaRecord, polarity: Polarity): boolean {
  switch (formula[0]) {
    case "or":
    case "implies":
      return polarity >= 0;
    case "and":
      return polarity <= 0;
    default:
      return formula[0] === "iff";
  }
}

/** How many clauses come of a formula where it matters in this way, at most. */
function size(formula: TermFormulaRecord, polarity: Polarity): number {
  const { truth, falsity } = sizes(formula);
  return polarity === 0 ? Math.max(truth, falsity) : polarity === 1 ? truth : falsity;
}

interface Sizes {
  /** How many clauses say that the formula is true, at most. */
  readonly truth: number;
  /** … that it is false. */
  readonly falsity: number;
}

const sizesCache = new WeakMap<TermFormulaRecord, Sizes>();

function sizes(formula: TermFormulaRecord): Sizes {
  let known = sizesCache.get(formula);
  if (known === undefined) {
    known = workOutSizes(formula);
    sizesCache.set(formula, known);
  }
  return known;
}

function workOutSizes(formula: TermFormulaRecord): Sizes {
  const sum = (numbers: readonly number[]) => numbers.reduce((total, one) => total + one, 0);
  const product = (numbers: readonly number[]) => numbers.reduce((total, one) => total * one, 1);
  switch (formula[0]) {
    case "not": {
      const { truth, falsity } = sizes(formula[1]);
      return { truth: falsity, falsity: truth };
    }
    case "forall":
    case "exists":
      return sizes(formula[2]);
    case "iff": {
      const left = sizes(formula[1]);
      const right = sizes(formula[2]);
      return {
        truth: left.falsity * right.truth + left.truth * right.falsity,
        falsity: left.falsity * right.falsity + left.truth * right.truth,
      };
    }
    case "implies": {
      const left = sizes(formula[1]);
      const right = sizes(formula[2]);
      return { truth: left.falsity * right.truth, falsity: left.truth + right.falsity };
    }
    case "and":
    case "or": {
      const parts = innerParts(formula).map(({ part }) => sizes(part));
      const truths = parts.map(({ truth }) => truth);
      const falsities = parts.map(({ falsity }) => falsity);
      return formula[0] === "and"
        ? { truth: sum(truths), falsity: product(falsities) }
        : { truth: product(truths), falsity: sum(falsities) };
    }
    default:
      return { truth: 1, falsity: 1 };
  }
}

/** The place of the part that gives most clauses; null when each gives one. */
function largestPart(formula: TermFormulaRecord, polarity: Polarity): number | null {
  let found: number | null = null;
  let most = 1;
  for (const { part, place } of innerParts(formula)) {
    const own = size(part, polarityAt(formula, place, polarity));
    if (own > most) {
      most = own;
      found = place;
    }
  }
  return found;
}
