/** What can be done to formulas over terms, and so to formulas, without regard to what they say. */
import type { Literal, Term, TermAtom, TermEquality, TermFormula } from "./clausal.ts";
import type { Variable } from "./formula.ts";

/** The immediate subformulas, in order. */
export function termFormulaParts(formula: TermFormula): readonly TermFormula[] {
  switch (formula.kind) {
    case "not":
    case "forall":
    case "exists":
      return [formula.body];
    case "and":
    case "or":
      return formula.parts;
    case "implies":
    case "iff":
      return [formula.left, formula.right];
    default:
      return [];
  }
}

/** The junction of any number of formulas, flat; a constant of none, the formula itself of one. */
export function join<F extends TermFormula>(kind: "and" | "or", parts: readonly F[]): F {
  const flat: TermFormula[] = [];
  for (const part of parts) {
    if (part.kind === kind) for (const inner of part.parts) flat.push(inner);
    else flat.push(part);
  }
  const [first] = flat;
  const joined: TermFormula =
    first === undefined
      ? { kind: kind === "and" ? "true" : "false" }
      : flat.length === 1
        ? first
        : { kind, parts: flat };
  // Made of parts of F alone.
  return joined as F;
}

/** A formula with other immediate subformulas, as many as it has. */
export function withParts<F extends TermFormula>(formula: F, parts: readonly F[]): F {
  const rebuilt = (): TermFormula => {
    switch (formula.kind) {
      case "not":
      case "forall":
      case "exists":
        return { ...formula, body: parts[0]! };
      case "and":
      case "or":
        return join<TermFormula>(formula.kind, parts);
      case "implies":
      case "iff":
        return { ...formula, left: parts[0]!, right: parts[1]! };
      default:
        return formula;
    }
  };
  // Of the kind of the formula, with parts of F.
  return rebuilt() as F;
}

/** Puts quantifiers of one kind before a formula, the first variable outermost. */
export function quantifyAll<F extends TermFormula>(
  kind: "forall" | "exists",
  variables: readonly Variable[],
  body: F,
): F {
  return variables.reduceRight<TermFormula>(
    (inner, variable) => ({ kind, variable, body: inner }),
    body,
  ) as F;
}

/** The arguments of an atom: those of the relation, or the two sides. */
export function argumentsOf(atom: TermAtom | TermEquality): readonly Term[] {
  return atom.kind === "atom" ? atom.args : [atom.left, atom.right];
}

/** The variables of a term, in the order they occur; each as often as it does. */
export function variablesOfTerm(term: Term): readonly Variable[] {
  return typeof term === "string" ? [term] : term.args.flatMap(variablesOfTerm);
}

const freeCache = new WeakMap<TermFormula, readonly Variable[]>();

/** The free variables, sorted by name. */
export function freeTermVariables(formula: TermFormula): readonly Variable[] {
  const known = freeCache.get(formula);
  if (known !== undefined) return known;
  const found = new Set<Variable>();
  if (formula.kind === "atom" || formula.kind === "equal")
    for (const term of argumentsOf(formula))
      for (const variable of variablesOfTerm(term)) found.add(variable);
  else
    for (const part of termFormulaParts(formula))
      for (const variable of freeTermVariables(part)) found.add(variable);
  if (formula.kind === "forall" || formula.kind === "exists") found.delete(formula.variable);
  const sorted = [...found].sort();
  freeCache.set(formula, sorted);
  return sorted;
}

export type TermSubstitution = ReadonlyMap<Variable, Term>;

export function substituteInTerm(term: Term, replacement: TermSubstitution): Term {
  if (typeof term === "string") return replacement.get(term) ?? term;
  return { ...term, args: term.args.map((arg) => substituteInTerm(arg, replacement)) };
}

/**
 * Replaces free variables by terms, all at once. No quantifier of the formula may bind a variable of an incoming
 * term: formulas whose variables are renamed apart are safe.
 */
export function substituteTerms(formula: TermFormula, replacement: TermSubstitution): TermFormula {
  if (!freeTermVariables(formula).some((variable) => replacement.has(variable))) return formula;
  switch (formula.kind) {
    case "atom":
      return { ...formula, args: formula.args.map((arg) => substituteInTerm(arg, replacement)) };
    case "equal":
      return {
        kind: "equal",
        left: substituteInTerm(formula.left, replacement),
        right: substituteInTerm(formula.right, replacement),
      };
    default:
      return withParts(
        formula,
        termFormulaParts(formula).map((part) => substituteTerms(part, replacement)),
      );
  }
}

const sizeCache = new WeakMap<TermFormula, number>();

/** How many subformulas there are, the formula itself included and repeated ones counted each time. */
export function partCount(formula: TermFormula): number {
  const known = sizeCache.get(formula);
  if (known !== undefined) return known;
  const count = termFormulaParts(formula).reduce((sum, part) => sum + partCount(part), 1);
  sizeCache.set(formula, count);
  return count;
}

/** How many connectives and quantifiers lie one inside another at most. */
export function nestingOf(formula: TermFormula): number {
  const depths = new Map<TermFormula, number>();
  const depth = (part: TermFormula): number => {
    const known = depths.get(part);
    if (known !== undefined) return known;
    const parts = termFormulaParts(part);
    const most =
      parts.length === 0 ? 0 : 1 + parts.reduce((deepest, inner) => Math.max(deepest, depth(inner)), 0);
    depths.set(part, most);
    return most;
  };
  return depth(formula);
}

/** Text that is the same for two terms just if they are the same term. */
export function termKey(term: Term): string {
  if (typeof term === "string") return term;
  return `${term.symbol.name}(${term.args.map(termKey).join(",")})`;
}

/** Text that is the same for two atoms just if they are the same, an equality being the same in both directions. */
export function atomKey(atom: TermAtom | TermEquality): string {
  if (atom.kind === "atom")
    return `${atom.relation.name}/${atom.relation.places}(${atom.args.map(termKey).join(",")})`;
  return [termKey(atom.left), termKey(atom.right)].sort().join("=");
}

export function literalKey(literal: Literal): string {
  return (literal.positive ? "+" : "-") + atomKey(literal.atom);
}

/** The literal that a formula is; null when it is none. */
export function literalOf(formula: TermFormula): Literal | null {
  if (formula.kind === "atom" || formula.kind === "equal") return { positive: true, atom: formula };
  if (formula.kind === "not" && (formula.body.kind === "atom" || formula.body.kind === "equal"))
    return { positive: false, atom: formula.body };
  return null;
}

export function formulaOfLiteral(literal: Literal): TermFormula {
  return literal.positive ? literal.atom : { kind: "not", body: literal.atom };
}
