/**
 * What of a formula's syntax decides whether it is in a fragment. All functions take formulas in negation normal form
 * without vacuous quantifiers, and are right for these as they stand; a formula that can be brought into a shape by
 * other means may still be refused.
 */

import type { Literal } from "./clausal.ts";
import {
  type Formula,
  freeVariables,
  partsOf,
  type RelationSymbol,
  relationsOf,
  type Variable,
} from "./formula.ts";
import { distribute } from "./normal-forms/distribute.ts";
import { bestPrefix, prefixFrom, pullOut } from "./normal-forms/prenex.ts";
import type { Limits } from "./normal-forms/result.ts";
import { matrixOf } from "./normal-forms/skolem.ts";
import { StepRecorder } from "./normal-forms/steps.ts";

/**
 * How many variables suffice when names are used again: the most free variables that a subformula has. Where none has
 * more than k, a quantifier always finds one of k names that is not free in its scope (common practice).
 */
export function widthOf(formula: Formula): number {
  return partsOf(formula).reduce(
    (most, part) => Math.max(most, widthOf(part)),
    freeVariables(formula).length,
  );
}

/**
 * For a formula in which no ∃ stands in the scope of ∀, so that its prefix can be ∃*∀*: a number k such that every
 * structure in which the formula holds has k points such that it holds in every substructure that contains these and
 * the values of the free variables. Conjuncts need their points together, of disjuncts one suffices. Null for other
 * formulas.
 */
export function witnessesOf(formula: Formula): number | null {
  if (formula.kind === "exists") {
    const inner = witnessesOf(formula.body);
    return inner === null ? null : inner + 1;
  }
  if (formula.kind === "forall") return hasExistential(formula.body) ? null : 0;
  let sum = 0;
  for (const part of partsOf(formula)) {
    const own = witnessesOf(part);
    if (own === null) return null;
    sum = formula.kind === "and" ? sum + own : Math.max(sum, own);
  }
  return sum;
}

function hasExistential(formula: Formula): boolean {
  return formula.kind === "exists" || partsOf(formula).some(hasExistential);
}

/**
 * The least m such that the formula comes to the prefix ∃*∀^m∃* by pulling quantifiers out, conjuncts sharing
 * universal variables; null when a ∀ stands in the scope of an ∃ that stands in the scope of a ∀.
 */
export function middleUniversals(formula: Formula): number | null {
  return universalsFrom(formula, "before");
}

/** Whether the quantifiers above a formula have no ∀, end with ∀, or have an ∃ after a ∀. */
type Stage = "before" | "within" | "after";

function universalsFrom(formula: Formula, stage: Stage): number | null {
  if (formula.kind === "exists") return universalsFrom(formula.body, stage === "before" ? "before" : "after");
  if (formula.kind === "forall") {
    const inner = stage === "after" ? null : universalsFrom(formula.body, "within");
    return inner === null ? null : inner + 1;
  }
  let total = 0;
  for (const part of partsOf(formula)) {
    const own = universalsFrom(part, stage);
    if (own === null) return null;
    total = formula.kind === "or" ? total + own : Math.max(total, own);
  }
  return total;
}

/**
 * The relations of a formula whose atoms have one variable each, as `Px` and `Rxx` do; null for other formulas. Such an
 * atom says something of one point, and each relation only one thing.
 */
export function monadicRelations(formula: Formula): readonly RelationSymbol[] | null {
  const isMonadic = (part: Formula): boolean =>
    part.kind === "atom" ? part.args.every((arg) => arg === part.args[0]) : partsOf(part).every(isMonadic);
  return isMonadic(formula) ? relationsOf(formula) : null;
}

/**
 * Whether conjuncts all come to the prefix ∃*∀*∃* with a Krom matrix: one that is a conjunction of disjunctions of at
 * most two literals. Their conjunction then does too.
 */
export function isMaslov(conjuncts: readonly Formula[], limits: Limits): boolean {
  return conjuncts.every((conjunct) => {
    if (middleUniversals(conjunct) === null) return false;
    const prenex = pullOut(conjunct, prefixFrom("exists", conjunct), limits, new StepRecorder(false));
    return isKrom(matrixOf(prenex) as Formula, limits);
  });
}

/** Whether a formula comes to the prefix ∀∃∀, some of these perhaps missing, with a Krom matrix. */
export function isAeaKrom(formula: Formula, limits: Limits): boolean {
  const prefix = prefixFrom("forall", formula);
  if (prefix.counts.length > 3 || prefix.counts.some((count) => count > 1)) return false;
  return isKrom(matrixOf(pullOut(formula, prefix, limits, new StepRecorder(false))) as Formula, limits);
}

function isKrom(matrix: Formula, limits: Limits): boolean {
  return distribute("and", matrix, limits).every((clause) => clause.length <= 2);
}

/** Literals of a formula without functions. */
interface PlainLiteral {
  readonly positive: boolean;
  /** The relation's name; `=` for identity, which no relation is called. */
  readonly name: string;
  readonly args: readonly Variable[];
}
type PlainClause = readonly PlainLiteral[];

/** The clauses of a formula whose prefix is ∀*; null for other formulas. */
function universalClauses(formula: Formula, limits: Limits): readonly PlainClause[] | null {
  if (hasExistential(formula)) return null;
  const prenex = pullOut(formula, bestPrefix(formula), limits, new StepRecorder(false));
  return distribute("and", matrixOf(prenex), limits).map((clause) => clause.map(plain));
}

function plain({ positive, atom }: Literal): PlainLiteral {
  // The matrix of a formula has no function symbols.
  const args = (atom.kind === "atom" ? atom.args : [atom.left, atom.right]) as readonly Variable[];
  return { positive, name: atom.kind === "atom" ? atom.relation.name : "=", args };
}

/** The two-place relation that a formula says to be transitive; null when that is not what it says. */
export function transitiveRelation(formula: Formula, limits: Limits): string | null {
  const clauses = universalClauses(formula, limits);
  const [clause, ...others] = clauses ?? [];
  if (clause === undefined || others.length > 0 || clause.length !== 3) return null;
  const head = clause.find(({ positive }) => positive);
  const [first, second, ...more] = clause.filter(({ positive }) => !positive);
  if (head === undefined || first === undefined || second === undefined || more.length > 0) return null;
  if (clause.some(({ name, args }) => name !== head.name || name === "=" || args.length !== 2)) return null;
  const [x, z] = head.args;
  const isChain = (left: PlainLiteral, right: PlainLiteral) =>
    left.args[0] === x && right.args[1] === z && left.args[1] === right.args[0];
  const distinct = new Set(clause.flatMap(({ args }) => args)).size === 3;
  return distinct && (isChain(first, second) || isChain(second, first)) ? head.name : null;
}

/**
 * Whether a formula is a conjunction of universal clauses, each of at most two variables or of the form "D(x), or
 * there is at most one y such that …": D(x) ∨ C(x, y) ∨ C(x, z) ∨ y = z with the same literals C for y as for z.
 */
export function isAtMostOne(formula: Formula, limits: Limits): boolean {
  const clauses = universalClauses(formula, limits);
  return clauses?.every((clause) => variablesIn(clause).length <= 2 || isAtMostOneClause(clause)) ?? false;
}

function variablesIn(clause: PlainClause): readonly Variable[] {
  return [...new Set(clause.flatMap(({ args }) => args))];
}

function isAtMostOneClause(clause: PlainClause): boolean {
  if (variablesIn(clause).length !== 3) return false;
  return clause.some((identity) => {
    if (!identity.positive || identity.name !== "=") return false;
    const [y, z] = identity.args as [Variable, Variable];
    const others = clause.filter((literal) => literal !== identity);
    if (others.some(({ args }) => args.includes(y) && args.includes(z))) return false;
    const keyOf = ({ positive, name, args }: PlainLiteral) => {
      const sorted = name === "=" ? [...args].sort() : args;
      return `${positive} ${name} ${sorted.join()}`;
    };
    const swap = (arg: Variable) => (arg === y ? z : arg === z ? y : arg);
    const keys = new Set(others.map(keyOf));
    return others.every((literal) => keys.has(keyOf({ ...literal, args: literal.args.map(swap) })));
  });
}
