/**
 * What a formula says in clauses, and formulas made of formulas: the part of the checker that turns sentences into
 * what a derivation starts from. The searches use it too, so that both mean the same by a clause and a function; that
 * is safe, since the checker works it all out again.
 */
import type { AtomRecord, ClauseRecord, LiteralRecord, TermFormulaRecord, TermRecord } from "./format.ts";

/** Literals in a clause form beyond which there is none. */
export const LARGEST_CLAUSE_FORM = 20_000;

/** Thrown when a clause form would have more than {@link LARGEST_CLAUSE_FORM} literals. */
export class ClauseFormTooLarge extends Error {}

type Terms = ReadonlyMap<string, TermRecord>;

export function substituteInTerm(term: TermRecord, terms: Terms): TermRecord {
  if (typeof term === "string") return terms.get(term) ?? term;
  const [name, ...args] = term;
  return [name, ...args.map((arg) => substituteInTerm(arg, terms))];
}

export function substituteInAtom(atom: AtomRecord, terms: Terms): AtomRecord {
  if (atom[0] === "=") return ["=", substituteInTerm(atom[1], terms), substituteInTerm(atom[2], terms)];
  const [head, name, ...args] = atom;
  return [head, name, ...args.map((arg) => substituteInTerm(arg, terms))];
}

export function substituteInClause(clause: ClauseRecord, terms: Terms): ClauseRecord {
  return clause.map((literal) =>
    literal[0] === "not" ? ["not", substituteInAtom(literal[1], terms)] : substituteInAtom(literal, terms),
  );
}

export function termVariables(term: TermRecord): readonly string[] {
  return typeof term === "string" ? [term] : term.slice(1).flatMap((arg) => termVariables(arg));
}

export function atomTerms(atom: AtomRecord): readonly TermRecord[] {
  return (atom[0] === "=" ? atom.slice(1) : atom.slice(2)) as TermRecord[];
}

/** The immediate subformulas, in order. */
function partsOf(formula: TermFormulaRecord): readonly TermFormulaRecord[] {
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

/** The free variables of a formula, each once, in the order they occur. */
export function freeVariables(formula: TermFormulaRecord): readonly string[] {
  const found =
    formula[0] === "is" || formula[0] === "="
      ? atomTerms(formula).flatMap(termVariables)
      : partsOf(formula).flatMap(freeVariables);
  const bound = formula[0] === "forall" || formula[0] === "exists" ? formula[1] : null;
  return [...new Set(found)].filter((variable) => variable !== bound);
}

/**
 * The clauses of a closed formula, in which ∃y φ has become φ with a function in place of y, of the variables that y
 * depends on (Skolem 1920; Andrews 1981 for the arguments), and ∨ is distributed over ∧. No clause is true by two
 * opposite literals or by t = t, none has t ≠ t or a literal twice.
 * @param number of the formula; its functions are called `number.0`, `number.1`, … in the order of their quantifiers
 * @throws ClauseFormTooLarge
 */
export function clauseForm(formula: TermFormulaRecord, number: number): readonly ClauseRecord[] {
  let functions = 0;
  const taken = new Set<string>();
  return clauses(formula, true, new Map());

  /** @param positive false for the clauses of the negation */
  function clauses(part: TermFormulaRecord, positive: boolean, terms: Terms): readonly ClauseRecord[] {
    const both = (kind: "and" | "or", parts: readonly (() => readonly ClauseRecord[])[]) =>
      (kind === "and") === positive
        ? conjunction(parts.map((one) => one()))
        : disjunction(parts.map((one) => one()));
    switch (part[0]) {
      case "true":
      case "false":
        return (part[0] === "true") === positive ? [] : [[]];
      case "is":
      case "=": {
        const atom = substituteInAtom(part, terms);
        return disjunction([[[positive ? atom : ["not", atom]]]]);
      }
      case "not":
        return clauses(part[1], !positive, terms);
      case "and":
      case "or":
        return both(
          part[0],
          partsOf(part).map((inner) => () => clauses(inner, positive, terms)),
        );
      case "implies":
        return both("or", [
          () => clauses(part[1], !positive, terms),
          () => clauses(part[2], positive, terms),
        ]);
      case "iff": {
        // ¬(φ ↔ ψ) is ¬φ ↔ ψ.
        const side = (left: boolean, right: boolean) =>
          disjunction([clauses(part[1], left, terms), clauses(part[2], right, terms)]);
        return conjunction([side(!positive, true), side(positive, false)]);
      }
      case "forall":
      case "exists": {
        const [kind, variable, body] = part;
        const value = (kind === "forall") === positive ? freshName(variable, taken) : chosen(part, terms);
        return clauses(body, positive, new Map(terms).set(variable, value));
      }
    }
  }

  /** The value of an existential variable: a function of what its formula depends on. */
  function chosen(part: TermFormulaRecord, terms: Terms): TermRecord {
    const args = freeVariables(part).flatMap((variable) => termVariables(terms.get(variable)!));
    return [`${number}.${functions++}`, ...new Set(args)];
  }
}

/** The name with as many primes as make it new; it is taken from then on. */
function freshName(like: string, taken: Set<string>): string {
  let name = like;
  while (taken.has(name)) name += "'";
  taken.add(name);
  return name;
}

function conjunction(sets: readonly (readonly ClauseRecord[])[]): readonly ClauseRecord[] {
  return sets.flat();
}

/** All clauses made of one of each set, simplified. */
function disjunction(sets: readonly (readonly ClauseRecord[])[]): readonly ClauseRecord[] {
  let result: ClauseRecord[] = [[]];
  let literals = 0;
  for (const set of sets) {
    const longer: ClauseRecord[] = [];
    for (const first of result)
      for (const second of set) {
        const joined = simplifyClause([...first, ...second]);
        if (joined === null) continue;
        longer.push(joined);
        literals += joined.length;
        if (literals > LARGEST_CLAUSE_FORM) throw new ClauseFormTooLarge();
      }
    result = longer;
  }
  return result;
}

/** A clause without repeated literals and without t ≠ t; null when it is true by opposite literals or t = t. */
export function simplifyClause(clause: ClauseRecord): ClauseRecord | null {
  const seen = new Map<string, LiteralRecord>();
  for (const literal of clause) {
    const positive = literal[0] !== "not";
    const atom = literal[0] === "not" ? literal[1] : literal;
    if (atom[0] === "=" && JSON.stringify(atom[1]) === JSON.stringify(atom[2])) {
      if (positive) return null;
      continue;
    }
    const key = JSON.stringify(atom);
    if (seen.has(`${!positive}${key}`)) return null;
    seen.set(`${positive}${key}`, literal);
  }
  return [...seen.values()];
}
