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

/** The formula that says that a term relates x to y. Bound variables are taken from neither. */
export function termFormula(term: RelationTerm, x: Variable, y: Variable): Formula {
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
      return termFormula(term.of, y, x);
    case "complement":
      return not(termFormula(term.of, x, y));
    case "composition": {
      const taken = new Set<Variable>([x, y]);
      const middle = ["z", "w", "u", "v"].find((name) => !taken.has(name)) ?? freshVariable("z", taken);
      return exists(middle, and(termFormula(term.left, x, middle), termFormula(term.right, middle, y)));
    }
    case "union":
      return or(termFormula(term.left, x, y), termFormula(term.right, x, y));
    case "intersection":
      return and(termFormula(term.left, x, y), termFormula(term.right, x, y));
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
