/** Relation terms: two-place relations made of others. They unfold to formulas. */
import {
  and,
  atom,
  equal,
  exists,
  type Formula,
  falsum,
  freshVariable,
  not,
  or,
  type RelationSymbol,
  substitute,
  type Variable,
  verum,
} from "./formula.ts";

export type RelationTerm =
  | { readonly kind: "relation"; readonly relation: RelationSymbol }
  /** A formula with two parameters, used as a relation. */
  | { readonly kind: "formula"; readonly parameters: readonly [Variable, Variable]; readonly body: Formula }
  | { readonly kind: "converse" | "complement"; readonly of: RelationTerm }
  | {
      readonly kind: "composition" | "union" | "intersection";
      readonly left: RelationTerm;
      readonly right: RelationTerm;
    }
  | { readonly kind: "id" | "full" | "none" };

const NOTHING: ReadonlySet<Variable> = new Set();
/** Variables for what is between two elements, in the order of preference. */
const BETWEEN: readonly Variable[] = ["z", "w", "u", "v", "t", "s", "r", "q", "p"];

/**
 * The formula that says that a term relates x to y. Its bound variables are neither of them; those inside one another
 * are used again as soon as they may be, so that a composition of any length needs three.
 * @param avoid what compositions should not bind either, so that the formula reads well inside another
 */
export function termFormula(
  term: RelationTerm,
  x: Variable,
  y: Variable,
  avoid: ReadonlySet<Variable> = NOTHING,
): Formula {
  const formulaOf = (part: RelationTerm, from: Variable, to: Variable) => termFormula(part, from, to, avoid);
  switch (term.kind) {
    case "relation":
      return atom(term.relation, x, y);
    case "formula":
      return substitute(
        term.body,
        new Map([
          [term.parameters[0], x],
          [term.parameters[1], y],
        ]),
      );
    case "converse":
      return formulaOf(term.of, y, x);
    case "complement":
      return not(formulaOf(term.of, x, y));
    case "composition": {
      const taken = new Set<Variable>([x, y, ...avoid]);
      const middle = BETWEEN.find((name) => !taken.has(name)) ?? freshVariable("z", taken);
      return exists(middle, and(formulaOf(term.left, x, middle), formulaOf(term.right, middle, y)));
    }
    case "union":
      return or(formulaOf(term.left, x, y), formulaOf(term.right, x, y));
    case "intersection":
      return and(formulaOf(term.left, x, y), formulaOf(term.right, x, y));
    case "id":
      return equal(x, y);
    case "full":
      return verum;
    case "none":
      return falsum;
  }
}

/** The term that relates elements joined by at least one and at most `count` steps of the given one. */
export function withinSteps(step: RelationTerm, count: number): RelationTerm {
  let term = step;
  for (let steps = 2; steps <= count; steps += 1)
    term = { kind: "union", left: step, right: { kind: "composition", left: step, right: term } };
  return term;
}

/** The formulas in a term, a relation counting as none. */
export function formulasIn(term: RelationTerm): readonly Formula[] {
  switch (term.kind) {
    case "formula":
      return [term.body];
    case "converse":
    case "complement":
      return formulasIn(term.of);
    case "composition":
    case "union":
    case "intersection":
      return [...formulasIn(term.left), ...formulasIn(term.right)];
    default:
      return [];
  }
}
