/**
 * Formulas, terms and clauses as records: nested lists, as evidence has them. Other than in `formula.ts` there may be
 * functions, which clause forms bring in; and since a record is JSON, what is read is what is reasoned about.
 *
 * A formula is `["is", "R", "x", "y"]`, `["=", "x", "y"]`, `["true"]`, `["false"]`, `["not", φ]`, `["and", φ, ψ, …]`,
 * `["or", φ, ψ, …]`, `["implies", φ, ψ]`, `["iff", φ, ψ]`, `["forall", "x", φ]` or `["exists", "x", φ]`.
 */
import type { Formula } from "../formula.ts";
import type { Meter } from "../meter.ts";

/** A variable, or a function with its arguments: `["2.0", "x"]`. Functions come in by clause forms alone. */
export type TermRecord = string | readonly [string, ...TermRecord[]];
/** `["is", "R", t, …]` or `["=", t, t]`. A relation that a derivation defines may have no arguments. */
export type AtomRecord = readonly ["is", string, ...TermRecord[]] | readonly ["=", TermRecord, TermRecord];
/** An atom or its negation. */
export type LiteralRecord = AtomRecord | readonly ["not", AtomRecord];
/** The disjunction of its literals, for all values of its variables; false when there are none. */
export type ClauseRecord = readonly LiteralRecord[];
/** A formula whose atoms may have terms and no arguments. */
export type TermFormulaRecord =
  | AtomRecord
  | readonly ["true" | "false"]
  | readonly ["not", TermFormulaRecord]
  | readonly ["and" | "or", ...TermFormulaRecord[]]
  | readonly ["implies" | "iff", TermFormulaRecord, TermFormulaRecord]
  | readonly ["forall" | "exists", string, TermFormulaRecord];

/** A sentence: closed, its terms are variables, its atoms have arguments. */
export type FormulaRecord = TermFormulaRecord;

/** The record of a formula. */
export function recordFormula(formula: Formula): FormulaRecord {
  switch (formula.kind) {
    case "true":
    case "false":
      return [formula.kind];
    case "atom":
      return ["is", formula.relation.name, ...formula.args];
    case "equal":
      return ["=", formula.left, formula.right];
    case "not":
      return ["not", recordFormula(formula.body)];
    case "and":
    case "or":
      return [formula.kind, ...formula.parts.map(recordFormula)];
    case "implies":
    case "iff":
      return [formula.kind, recordFormula(formula.left), recordFormula(formula.right)];
    case "forall":
    case "exists":
      return [formula.kind, formula.variable, recordFormula(formula.body)];
  }
}

/** What stands in place of variables. */
export type Terms = ReadonlyMap<string, TermRecord>;

/** Thrown when formulas or clauses made of others would be larger than a bound. */
export class FormulaTooLarge extends Error {}

/** Parts that are made by one operation at most when nobody sets another bound. */
const LARGEST_FORMULA = 100_000;

/** Counts parts of formulas and terms as they are made: repeated unfolding could double them without end. */
export class Growth {
  readonly #meter: Meter | null;
  #left: number;

  /** @param meter pays a thousandth of a step for each part */
  constructor(limit: number = LARGEST_FORMULA, meter: Meter | null = null) {
    this.#left = limit;
    this.#meter = meter;
  }

  /** @throws FormulaTooLarge */
  add(parts = 1): void {
    this.#left -= parts;
    if (this.#left < 0) throw new FormulaTooLarge();
    this.#meter?.charge(parts);
  }
}

const NOTHING: Terms = new Map();

/**
 * The term with terms in place of variables, all at once.
 * @param growth counts the parts of what comes out
 */
export function substituteInTerm(term: TermRecord, terms: Terms, growth?: Growth): TermRecord {
  growth?.add();
  if (typeof term === "string") {
    const value = terms.get(term);
    if (value === undefined || growth === undefined) return value ?? term;
    // A copy, so that its parts are counted.
    return substituteInTerm(value, NOTHING, growth);
  }
  const [name, ...args] = term;
  return [name, ...args.map((arg) => substituteInTerm(arg, terms, growth))];
}

/** As {@link substituteInTerm}, in an atom. */
export function substituteInAtom(atom: AtomRecord, terms: Terms, growth?: Growth): AtomRecord {
  return changeTerms(atom, (term) => substituteInTerm(term, terms, growth));
}

/** The atom with each of its terms changed. */
export function changeTerms(atom: AtomRecord, change: (term: TermRecord) => TermRecord): AtomRecord {
  if (atom[0] === "=") return ["=", change(atom[1]), change(atom[2])];
  const [head, name, ...args] = atom;
  return [head, name, ...args.map(change)];
}

/** As {@link substituteInTerm}, in a clause; its literals stay as many and in order. */
export function substituteInClause(clause: ClauseRecord, terms: Terms, growth?: Growth): ClauseRecord {
  return clause.map((literal) => changeAtom(literal, (atom) => substituteInAtom(atom, terms, growth)));
}

/** The literal with another atom, negated if it is. */
export function changeAtom(literal: LiteralRecord, change: (atom: AtomRecord) => AtomRecord): LiteralRecord {
  return literal[0] === "not" ? ["not", change(literal[1])] : change(literal);
}

/** The atom of a literal. */
export function atomOf(literal: LiteralRecord): AtomRecord {
  return literal[0] === "not" ? literal[1] : literal;
}

/** The variables of a term, as often as they occur. */
export function termVariables(term: TermRecord): readonly string[] {
  return typeof term === "string" ? [term] : term.slice(1).flatMap((arg) => termVariables(arg));
}

/** The names of the functions of a term, as often as they occur. */
export function termFunctions(term: TermRecord): readonly string[] {
  if (typeof term === "string") return [];
  const [name, ...args] = term;
  return [name, ...args.flatMap(termFunctions)];
}

/** Whether two terms are the same; the parts that are looked at count. */
export function isSameTerm(left: TermRecord, right: TermRecord, growth: Growth): boolean {
  growth.add();
  if (typeof left === "string" || typeof right === "string") return left === right;
  const [[name, ...args], [other, ...others]] = [left, right];
  return (
    name === other &&
    args.length === others.length &&
    args.every((arg, place) => isSameTerm(arg, others[place]!, growth))
  );
}

/** The terms of an atom, in order. */
export function atomTerms(atom: AtomRecord): readonly TermRecord[] {
  return (atom[0] === "=" ? atom.slice(1) : atom.slice(2)) as TermRecord[];
}

/** The immediate subformulas, in order. */
export function partsOf(formula: TermFormulaRecord): readonly TermFormulaRecord[] {
  switch (formula[0]) {
    case "is":
    case "=":
      return [];
    case "forall":
    case "exists":
      return [formula[2]];
    default:
      return formula.slice(1) as TermFormulaRecord[];
  }
}

/** Calls `see` on every atom of a formula. */
export function visitAtoms(
  formula: TermFormulaRecord,
  growth: Growth,
  see: (atom: AtomRecord) => void,
): void {
  growth.add();
  if (formula[0] === "is" || formula[0] === "=") see(formula);
  else for (const part of partsOf(formula)) visitAtoms(part, growth, see);
}

/** The formula with other subformulas in place of its own, as many and in the same order. */
export function withParts(
  formula: TermFormulaRecord,
  parts: readonly TermFormulaRecord[],
): TermFormulaRecord {
  if (formula[0] === "is" || formula[0] === "=") return formula;
  if (formula[0] === "forall" || formula[0] === "exists") return [formula[0], formula[1], parts[0]!];
  return [formula[0], ...parts] as TermFormulaRecord;
}

/** Remembered, since quantifiers ask for it again at each level. */
const freeOf = new WeakMap<TermFormulaRecord, readonly string[]>();

/** The free variables of a formula, each once, in the order they occur. */
export function freeVariables(formula: TermFormulaRecord): readonly string[] {
  const known = freeOf.get(formula);
  if (known !== undefined) return known;
  const found =
    formula[0] === "is" || formula[0] === "="
      ? atomTerms(formula).flatMap(termVariables)
      : partsOf(formula).flatMap(freeVariables);
  const bound = formula[0] === "forall" || formula[0] === "exists" ? formula[1] : null;
  const free = [...new Set(found)].filter((variable) => variable !== bound);
  freeOf.set(formula, free);
  return free;
}

/** The name with as many primes as make it new. */
export function freshName(like: string, taken: ReadonlySet<string>): string {
  let name = like;
  while (taken.has(name)) name += "'";
  return name;
}

/**
 * The formula with terms in place of its free variables. A quantifier whose variable occurs in a term that comes into
 * its scope binds another variable instead.
 * @throws FormulaTooLarge
 */
export function substitute(formula: TermFormulaRecord, terms: Terms, growth: Growth): TermFormulaRecord {
  growth.add();
  if (formula[0] === "is" || formula[0] === "=") return substituteInAtom(formula, terms, growth);
  if (formula[0] !== "forall" && formula[0] !== "exists")
    return withParts(
      formula,
      partsOf(formula).map((part) => substitute(part, terms, growth)),
    );
  const [kind, variable, body] = formula;
  const coming = new Map(
    freeVariables(formula).flatMap((free) => (terms.has(free) ? [[free, terms.get(free)!]] : [])),
  );
  const taken = new Set([...coming.values()].flatMap(termVariables));
  const name = taken.has(variable)
    ? freshName(variable, new Set([...taken, ...freeVariables(body)]))
    : variable;
  return [kind, name, substitute(body, coming.set(variable, name), growth)];
}

/** Whether two closed formulas are the same up to the names of bound variables. */
export function sameUpToNames(left: TermFormulaRecord, right: TermFormulaRecord): boolean {
  return JSON.stringify(renamed(left, 0, new Map())) === JSON.stringify(renamed(right, 0, new Map()));
}

/** The formula with the variable of each quantifier called by how many quantifiers are around it. */
function renamed(formula: TermFormulaRecord, depth: number, names: Terms): TermFormulaRecord {
  if (formula[0] === "is" || formula[0] === "=") return substituteInAtom(formula, names);
  const [kind, variable] = formula;
  const isQuantified = kind === "forall" || kind === "exists";
  const inner = isQuantified ? new Map(names).set(variable as string, `${depth}`) : names;
  const parts = partsOf(formula).map((part) => renamed(part, isQuantified ? depth + 1 : depth, inner));
  return isQuantified ? [kind, `${depth}`, parts[0]!] : withParts(formula, parts);
}
