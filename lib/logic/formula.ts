/**
 * Formulas of relational first-order logic with identity: variables and relations, no function symbols.
 *
 * A formula is immutable data. Quantifiers bind one variable each; `∀x ∀y` is two of them, and printing groups
 * them again. Conjunctions and disjunctions are flat (no part has the kind of the whole) and have at least two
 * parts; build them with {@link and} and {@link or}, which keep that. `x ≠ y` is the negation of `x = y`.
 */

/** A variable: a lower-case letter, then digits, then primes. */
export type Variable = string;

/** A declared relation. Two symbols are the same relation when name and number of places agree. */
export interface RelationSymbol {
  readonly name: string;
  /** How many arguments an atom has; at least 1. */
  readonly places: number;
  /** Written between its two arguments. A matter of printing only. */
  readonly infix: boolean;
}

export interface Atom {
  readonly kind: "atom";
  readonly relation: RelationSymbol;
  /** As many as the relation has places. */
  readonly args: readonly Variable[];
}
export interface Equality {
  readonly kind: "equal";
  readonly left: Variable;
  readonly right: Variable;
}
export interface Truth {
  readonly kind: "true" | "false";
}
export interface Negation {
  readonly kind: "not";
  readonly body: Formula;
}
export interface Junction {
  readonly kind: "and" | "or";
  /** At least two, none of this junction's own kind. */
  readonly parts: readonly Formula[];
}
export interface Conditional {
  readonly kind: "implies" | "iff";
  readonly left: Formula;
  readonly right: Formula;
}
export interface Quantified {
  readonly kind: "forall" | "exists";
  readonly variable: Variable;
  readonly body: Formula;
}
export type Formula = Atom | Equality | Truth | Negation | Junction | Conditional | Quantified;

export const verum: Formula = { kind: "true" };
export const falsum: Formula = { kind: "false" };

export function atom(relation: RelationSymbol, ...args: Variable[]): Formula {
  return { kind: "atom", relation, args };
}

export function equal(left: Variable, right: Variable): Formula {
  return { kind: "equal", left, right };
}

/** The negation; `¬¬φ` is kept as written. */
export function not(body: Formula): Formula {
  return { kind: "not", body };
}

/** The conjunction of any number of formulas: `⊤` of none, the formula itself of one, nested ones flattened. */
export function and(...parts: Formula[]): Formula {
  return junction("and", parts);
}

/** The disjunction of any number of formulas: `⊥` of none, the formula itself of one, nested ones flattened. */
export function or(...parts: Formula[]): Formula {
  return junction("or", parts);
}

function junction(kind: "and" | "or", parts: readonly Formula[]): Formula {
  const flat: Formula[] = [];
  for (const part of parts) {
    if (part.kind === kind) for (const inner of part.parts) flat.push(inner);
    else flat.push(part);
  }
  if (flat.length === 0) return kind === "and" ? verum : falsum;
  return flat.length === 1 ? flat[0]! : { kind, parts: flat };
}

export function implies(left: Formula, right: Formula): Formula {
  return { kind: "implies", left, right };
}

export function iff(left: Formula, right: Formula): Formula {
  return { kind: "iff", left, right };
}

export function forall(variables: Variable | readonly Variable[], body: Formula): Formula {
  return quantify("forall", variables, body);
}

export function exists(variables: Variable | readonly Variable[], body: Formula): Formula {
  return quantify("exists", variables, body);
}

/** Puts quantifiers of one kind before a formula, the first variable outermost. */
export function quantify(
  kind: "forall" | "exists",
  variables: Variable | readonly Variable[],
  body: Formula,
): Formula {
  const list = typeof variables === "string" ? [variables] : variables;
  return list.reduceRight<Formula>((inner, variable) => ({ kind, variable, body: inner }), body);
}

/** The immediate subformulas, in order. */
export function partsOf(formula: Formula): readonly Formula[] {
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

/** Rebuilds a formula with each immediate subformula replaced; atoms come back as they are. */
export function mapParts(formula: Formula, change: (part: Formula) => Formula): Formula {
  switch (formula.kind) {
    case "not":
    case "forall":
    case "exists":
      return { ...formula, body: change(formula.body) };
    case "and":
    case "or":
      return junction(formula.kind, formula.parts.map(change));
    case "implies":
    case "iff":
      return { ...formula, left: change(formula.left), right: change(formula.right) };
    default:
      return formula;
  }
}

/** Rebuilds a formula with every relational atom replaced; the replacement's variables must be the atom's own. */
export function mapAtoms(formula: Formula, change: (atom: Atom) => Formula): Formula {
  return formula.kind === "atom" ? change(formula) : mapParts(formula, (part) => mapAtoms(part, change));
}

const freeCache = new WeakMap<Formula, readonly Variable[]>();

/** The free variables, sorted by name. */
export function freeVariables(formula: Formula): readonly Variable[] {
  const known = freeCache.get(formula);
  if (known !== undefined) return known;
  let found: Variable[];
  if (formula.kind === "atom") found = [...formula.args];
  else if (formula.kind === "equal") found = [formula.left, formula.right];
  else if (formula.kind === "forall" || formula.kind === "exists")
    found = freeVariables(formula.body).filter((variable) => variable !== formula.variable);
  else found = partsOf(formula).flatMap((part) => [...freeVariables(part)]);
  const sorted = [...new Set(found)].sort();
  freeCache.set(formula, sorted);
  return sorted;
}

/** All variables that occur, free, bound or beside a quantifier, sorted by name. */
export function variablesOf(formula: Formula): readonly Variable[] {
  const found = new Set<Variable>();
  visit(formula, (part) => {
    if (part.kind === "atom") for (const variable of part.args) found.add(variable);
    else if (part.kind === "equal") found.add(part.left).add(part.right);
    else if (part.kind === "forall" || part.kind === "exists") found.add(part.variable);
  });
  return [...found].sort();
}

/** Calls `see` on the formula and all its subformulas, outermost first. */
export function visit(formula: Formula, see: (part: Formula) => void): void {
  see(formula);
  for (const part of partsOf(formula)) visit(part, see);
}

/** The quantifier rank: how many quantifiers lie one inside another at most. */
export function depthOf(formula: Formula): number {
  const inner = partsOf(formula).reduce((most, part) => Math.max(most, depthOf(part)), 0);
  return formula.kind === "forall" || formula.kind === "exists" ? inner + 1 : inner;
}

/** The relations that occur, sorted by name. */
export function relationsOf(formula: Formula): readonly RelationSymbol[] {
  const found = new Map<string, RelationSymbol>();
  visit(formula, (part) => {
    if (part.kind === "atom") found.set(`${part.relation.name}/${part.relation.places}`, part.relation);
  });
  return [...found.entries()].sort(([a], [b]) => (a < b ? -1 : 1)).map(([, symbol]) => symbol);
}

/** Whether `=` occurs. */
export function usesIdentity(formula: Formula): boolean {
  return formula.kind === "equal" || partsOf(formula).some(usesIdentity);
}

/** A variable that is not in `taken`: the given one with the least number of primes added. */
export function freshVariable(like: Variable, taken: ReadonlySet<Variable>): Variable {
  let name = like;
  while (taken.has(name)) name += "'";
  return name;
}

/**
 * Replaces free variables by others, all at once. Bound variables that would capture an incoming one are renamed
 * by adding primes.
 */
export function substitute(formula: Formula, replacement: ReadonlyMap<Variable, Variable>): Formula {
  const relevant = freeVariables(formula).filter((v) => replacement.has(v) && replacement.get(v) !== v);
  if (relevant.length === 0) return formula;
  const of = (variable: Variable) => replacement.get(variable) ?? variable;
  switch (formula.kind) {
    case "atom":
      return { ...formula, args: formula.args.map(of) };
    case "equal":
      return equal(of(formula.left), of(formula.right));
    case "forall":
    case "exists": {
      const inner = new Map(relevant.map((variable) => [variable, of(variable)]));
      const incoming = new Set(inner.values());
      if (!incoming.has(formula.variable)) return { ...formula, body: substitute(formula.body, inner) };
      const renamed = freshVariable(
        formula.variable,
        new Set([...variablesOf(formula.body), ...incoming, ...inner.keys()]),
      );
      inner.set(formula.variable, renamed);
      return { ...formula, variable: renamed, body: substitute(formula.body, inner) };
    }
    default:
      return mapParts(formula, (part) => substitute(part, replacement));
  }
}

/** Whether two formulas are the same up to the names of bound variables. */
export function sameFormula(left: Formula, right: Formula): boolean {
  return same(left, right, new Map(), new Map(), 0);
}

/** `bound` maps hold, for each variable in scope, the number of the quantifier that binds it. */
function same(
  left: Formula,
  right: Formula,
  boundLeft: ReadonlyMap<Variable, number>,
  boundRight: ReadonlyMap<Variable, number>,
  count: number,
): boolean {
  const sameVariable = (a: Variable, b: Variable) => {
    const i = boundLeft.get(a);
    const j = boundRight.get(b);
    return i === undefined && j === undefined ? a === b : i === j;
  };
  if (left.kind !== right.kind) return false;
  if (left.kind === "atom" && right.kind === "atom")
    return (
      left.relation.name === right.relation.name &&
      left.args.length === right.args.length &&
      left.args.every((variable, index) => sameVariable(variable, right.args[index]!))
    );
  if (left.kind === "equal" && right.kind === "equal")
    return sameVariable(left.left, right.left) && sameVariable(left.right, right.right);
  if (
    (left.kind === "forall" || left.kind === "exists") &&
    (right.kind === "forall" || right.kind === "exists")
  )
    return same(
      left.body,
      right.body,
      new Map(boundLeft).set(left.variable, count),
      new Map(boundRight).set(right.variable, count),
      count + 1,
    );
  const leftParts = partsOf(left);
  const rightParts = partsOf(right);
  return (
    leftParts.length === rightParts.length &&
    leftParts.every((part, index) => same(part, rightParts[index]!, boundLeft, boundRight, count))
  );
}
