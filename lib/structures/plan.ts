/**
 * A sentence made ready for walking over a carrier: variables become places in a configuration, and every
 * subformula sees only the elements that it speaks of. The walk is shared by evaluation (`evaluate.ts`) and by
 * grounding (`ground.ts`).
 */
import type { Carrier } from "../carriers/carrier.ts";
import { type Formula, freeVariables, type RelationSymbol, type Variable } from "../logic/formula.ts";

interface PlanBase {
  /** Number of this node within its plan, from 0. */
  readonly id: number;
  /** How many elements the configuration has at which this node is looked at: its free variables, in a fixed order. */
  readonly width: number;
  /**
   * Where in the parent's configuration those elements stand; null when the configuration is the parent's own. In
   * a quantifier, the parent's configuration is the extended one.
   */
  readonly places: readonly number[] | null;
  /**
   * Whether the same configuration can come back: some variable in scope is not free here, so that the result is
   * worth remembering.
   */
  readonly recurs: boolean;
}

export type Plan = PlanBase &
  (
    | { readonly kind: "true" | "false" }
    | { readonly kind: "atom"; readonly relation: RelationSymbol; readonly args: readonly number[] }
    | { readonly kind: "equal"; readonly left: number; readonly right: number }
    | { readonly kind: "not"; readonly body: Plan }
    | { readonly kind: "and" | "or"; readonly parts: readonly Plan[] }
    | { readonly kind: "implies" | "iff"; readonly first: Plan; readonly second: Plan }
    | {
        readonly kind: "forall" | "exists";
        readonly body: Plan;
        /** How many quantifiers lie inside this one: what a carrier must allow for when it lists extensions. */
        readonly toCome: number;
      }
  );

/** Prepares a closed formula. */
export function planSentence(sentence: Formula): Plan {
  let nodes = 0;
  return prepare(sentence, [], false);

  /**
   * @param scope the variables of the parent's configuration, in its order
   * @param forgetful whether something in scope further out has already been left behind
   */
  function prepare(formula: Formula, scope: readonly Variable[], forgetful: boolean): Plan {
    const free = new Set(freeVariables(formula));
    // No variable stands in scope twice: where a quantifier binds one again, the outer one is not free inside.
    const own = scope.filter((variable) => free.has(variable));
    const places = own.length === scope.length ? null : own.map((variable) => scope.indexOf(variable));
    const recurs = forgetful || places !== null;
    const base = { id: nodes++, width: own.length, places, recurs };
    const place = (variable: Variable) => own.indexOf(variable);
    switch (formula.kind) {
      case "true":
      case "false":
        return { ...base, kind: formula.kind };
      case "atom":
        return { ...base, kind: "atom", relation: formula.relation, args: formula.args.map(place) };
      case "equal":
        return { ...base, kind: "equal", left: place(formula.left), right: place(formula.right) };
      case "not":
        return { ...base, kind: "not", body: prepare(formula.body, own, recurs) };
      case "and":
      case "or":
        return {
          ...base,
          kind: formula.kind,
          parts: formula.parts.map((part) => prepare(part, own, recurs)),
        };
      case "implies":
      case "iff":
        return {
          ...base,
          kind: formula.kind,
          first: prepare(formula.left, own, recurs),
          second: prepare(formula.right, own, recurs),
        };
      case "forall":
      case "exists": {
        const body = prepare(formula.body, [...own, formula.variable], recurs);
        return { ...base, kind: formula.kind, body, toCome: planDepth(body) };
      }
    }
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

/** The configuration at which a node is looked at, from its parent's. */
export function enter(carrier: Carrier, plan: Plan, configuration: unknown): unknown {
  return plan.places === null ? configuration : carrier.restrict(configuration, plan.places);
}
