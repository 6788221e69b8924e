/** Removing constants, repeated and complementary parts, and quantifiers that bind nothing. */

import { join } from "../clausal-formulas.ts";
import { type Formula, falsum, freeVariables, verum } from "../formula.ts";
import { type Rule, rewriteUpwards, type StepRecorder } from "./steps.ts";

/**
 * Simplifies a formula in negation normal form, which stays one. Parts are compared as they are written; `x = y` and
 * `y = x` are the same.
 */
export function simplify(formula: Formula, recorder: StepRecorder): Formula {
  const keys = new KeyTable();
  const result = rewriteUpwards(
    formula,
    (part) => simplifyHere(part, keys),
    (whole) => whole,
    recorder,
  );
  recorder.endPhase("constants and repeated parts removed", () => ({ kind: "formula", formula: result }));
  return result;
}

/** Drops quantifiers whose variable does not occur in their scope, which changes nothing since domains are not empty. */
export function dropVacuous(formula: Formula, recorder: StepRecorder): Formula {
  const rule: Rule = (part) =>
    (part.kind === "forall" || part.kind === "exists") && !freeVariables(part.body).includes(part.variable)
      ? { done: "vacuous quantifier dropped", formula: part.body }
      : null;
  const result = rewriteUpwards(formula, rule, (whole) => whole, recorder);
  recorder.endPhase("vacuous quantifiers dropped", () => ({ kind: "formula", formula: result }));
  return result;
}

function simplifyHere(formula: Formula, keys: KeyTable): ReturnType<Rule> {
  switch (formula.kind) {
    case "equal":
      return formula.left === formula.right ? { done: "x = x replaced by ⊤", formula: verum } : null;
    case "not":
      if (formula.body.kind === "true") return { done: "negated constant removed", formula: falsum };
      if (formula.body.kind === "false") return { done: "negated constant removed", formula: verum };
      return null;
    case "forall":
    case "exists":
      return formula.body.kind === "true" || formula.body.kind === "false"
        ? { done: "vacuous quantifier dropped", formula: formula.body }
        : null;
    case "and":
    case "or":
      return simplifyJunction(formula, keys);
    default:
      return null;
  }
}

function simplifyJunction(formula: Formula & { kind: "and" | "or" }, keys: KeyTable): ReturnType<Rule> {
  const { kind, parts } = formula;
  const [neutral, absorbing] = kind === "and" ? (["true", "false"] as const) : (["false", "true"] as const);
  if (parts.some((part) => part.kind === absorbing))
    return { done: "constant removed", formula: { kind: absorbing } };
  const others = parts.filter((part) => part.kind !== neutral);
  if (others.length < parts.length) return { done: "constant removed", formula: join(kind, others) };
  const seen = new Set<number>();
  const distinct = parts.filter((part) => {
    const key = keys.keyOf(part);
    if (seen.has(key)) return false;
    seen.add(key);
    return true;
  });
  if (distinct.some((part) => part.kind === "not" && seen.has(keys.keyOf(part.body))))
    return { done: "complementary parts removed", formula: { kind: absorbing } };
  if (distinct.length < parts.length) return { done: "repeated part removed", formula: join(kind, distinct) };
  return null;
}

/** Numbers formulas so that two have the same number just if they are written the same. */
class KeyTable {
  readonly #numbers = new Map<string, number>();
  readonly #known = new WeakMap<Formula, number>();

  keyOf(formula: Formula): number {
    const known = this.#known.get(formula);
    if (known !== undefined) return known;
    const text = this.#describe(formula);
    const number = this.#numbers.get(text) ?? this.#numbers.size;
    this.#numbers.set(text, number);
    this.#known.set(formula, number);
    return number;
  }

  /** The formula with the numbers of its parts in place of them. */
  #describe(formula: Formula): string {
    switch (formula.kind) {
      case "atom":
        return `${formula.relation.name}/${formula.args.join()}`;
      case "equal":
        return [formula.left, formula.right].sort().join("=");
      case "not":
        return `not ${this.keyOf(formula.body)}`;
      case "forall":
      case "exists":
        return `${formula.kind} ${formula.variable} ${this.keyOf(formula.body)}`;
      case "and":
      case "or":
        return `${formula.kind} ${formula.parts.map((part) => this.keyOf(part)).join()}`;
      case "implies":
      case "iff":
        return `${formula.kind} ${this.keyOf(formula.left)} ${this.keyOf(formula.right)}`;
      default:
        return formula.kind;
    }
  }
}
