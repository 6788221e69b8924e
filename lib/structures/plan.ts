/**
 * A sentence made ready for walking over a carrier: variables become places in a configuration. A quantifier looks
 * only at the elements that are free in it, so that its configuration is small and recurs; everything between two
 * quantifiers shares the configuration of the outer one. The walk is shared by evaluation (`evaluate.ts`) and by
 * grounding (`ground.ts`).
 */
import type { Carrier } from "../carriers/carrier.ts";
import { type Formula, freeVariables, type RelationSymbol, type Variable } from "../logic/formula.ts";

export interface QuantifierPlan {
  readonly kind: "forall" | "exists";
  /** Number of this quantifier within its plan, from 0. */
  readonly id: number;
  /**
   * Where in the configuration outside the elements stand that are free here; null when they are all of it, in
   * order. The body's configuration has these elements and, last, the new one.
   */
  readonly places: readonly number[] | null;
  /** How many elements its own configuration has, before the new one. */
  readonly named: number;
  /** Whether the same configuration can come back, so that the result is worth remembering. */
  readonly recurs: boolean;
  /** How many quantifiers lie inside this one: what a carrier must allow for when it lists extensions. */
  readonly toCome: number;
  readonly body: Plan;
}

export type Plan =
  | { readonly kind: "true" | "false" }
  | { readonly kind: "atom"; readonly relation: RelationSymbol; readonly args: readonly number[] }
  | { readonly kind: "equal"; readonly left: number; readonly right: number }
  | { readonly kind: "not"; readonly body: Plan }
  | { readonly kind: "and" | "or"; readonly parts: readonly Plan[] }
  | { readonly kind: "implies" | "iff"; readonly first: Plan; readonly second: Plan }
  | QuantifierPlan;

/**
 * Prepares a closed formula.
 * @param recurs whether the same configuration comes back everywhere, as it does on infinite carriers: of those listed for
 *   one quantifier many need not be told apart any more by the next
 */
export function planSentence(sentence: Formula, recurs = false): Plan {
  let quantifiers = 0;
  return prepare(sentence, [], recurs);

  /**
   * @param scope the variables of the configuration, in its order, each once
   * @param recurs whether something in scope further out has already been left behind
   */
  function prepare(formula: Formula, scope: readonly Variable[], recurs: boolean): Plan {
    const part = (inner: Formula) => prepare(inner, scope, recurs);
    const place = (variable: Variable) => scope.indexOf(variable);
    switch (formula.kind) {
      case "true":
      case "false":
        return { kind: formula.kind };
      case "atom":
        return { kind: "atom", relation: formula.relation, args: formula.args.map(place) };
      case "equal":
        return { kind: "equal", left: place(formula.left), right: place(formula.right) };
      case "not":
        return { kind: "not", body: part(formula.body) };
      case "and":
      case "or":
        return { kind: formula.kind, parts: formula.parts.map(part) };
      case "implies":
      case "iff":
        return { kind: formula.kind, first: part(formula.left), second: part(formula.right) };
      case "forall":
      case "exists": {
        const id = quantifiers++;
        const free = new Set(freeVariables(formula));
        const kept = scope.filter((variable) => free.has(variable));
        const all = kept.length === scope.length;
        const places = all ? null : kept.map((variable) => scope.indexOf(variable));
        const body = prepare(formula.body, [...kept, formula.variable], recurs || !all);
        const named = kept.length;
        return {
          kind: formula.kind,
          id,
          places,
          named,
          recurs: recurs || !all,
          toCome: planDepth(body),
          body,
        };
      }
    }
  }
}

/**
 * A bound on how many nodes a walk over a carrier visits when it leaves nothing out; infinite beyond all use.
 */
export function mostVisits(plan: Plan, carrier: Carrier): number {
  const visits = (part: Plan) => mostVisits(part, carrier);
  switch (plan.kind) {
    case "not":
      return 1 + visits(plan.body);
    case "and":
    case "or":
      return plan.parts.reduce((sum, part) => sum + visits(part), 1);
    case "implies":
    case "iff":
      return 1 + visits(plan.first) + visits(plan.second);
    case "forall":
    case "exists":
      return 1 + carrier.mostExtensions(plan.named, plan.toCome) * visits(plan.body);
    default:
      return 1;
  }
}

/** A bound on how many configurations such a walk lists; infinite beyond all use. */
export function mostListed(plan: Plan, carrier: Carrier): number {
  const listed = (part: Plan) => mostListed(part, carrier);
  switch (plan.kind) {
    case "not":
      return listed(plan.body);
    case "and":
    case "or":
      return plan.parts.reduce((sum, part) => sum + listed(part), 0);
    case "implies":
    case "iff":
      return listed(plan.first) + listed(plan.second);
    case "forall":
    case "exists":
      return carrier.mostExtensions(plan.named, plan.toCome) * (1 + listed(plan.body));
    default:
      return 0;
  }
}

function planDepth(plan: Plan): number {
  switch (plan.kind) {
    case "not":
      return planDepth(plan.body);
    case "and":
    case "or":
      return plan.parts.reduce((most, part) => Math.max(most, planDepth(part)), 0);
    case "implies":
    case "iff":
      return Math.max(planDepth(plan.first), planDepth(plan.second));
    case "forall":
    case "exists":
      return plan.toCome + 1;
    default:
      return 0;
  }
}

/** Results that are remembered at most; what comes after them is worked out again. */
const MOST_REMEMBERED = 1_000_000;

/** What has been found out about quantifiers at configurations, for those that recur. */
export class Memory<Result> {
  readonly #results: Map<string | number, Result>[] = [];
  #count = 0;

  get(quantifier: QuantifierPlan, key: string | number): Result | undefined {
    return this.#results[quantifier.id]?.get(key);
  }

  set(quantifier: QuantifierPlan, key: string | number, result: Result): void {
    if (this.#count >= MOST_REMEMBERED) return;
    this.#count += 1;
    let results = this.#results[quantifier.id];
    if (results === undefined) {
      results = new Map();
      this.#results[quantifier.id] = results;
    }
    results.set(key, result);
  }
}
