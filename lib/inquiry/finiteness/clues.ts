/**
 * What axioms show about where a reason may be found: which elements they say exist, which steps they make from elements
 * to others, and which relations they give partners in. What is tried, and in which order, depends on it, and nothing else.
 */
import {
  type Atom,
  and,
  exists,
  type Formula,
  freshVariable,
  not,
  or,
  type RelationSymbol,
  substitute,
  type Variable,
  variablesOf,
} from "../../logic/formula.ts";
import type { Witness } from "./reason.ts";

/** ∀ `from` (`guard` → ∃ `to` `body`), as an axiom says; perhaps of the elements of a witness. */
export interface Step {
  readonly witness: Witness | null;
  readonly from: readonly Variable[];
  readonly guard: Formula;
  readonly to: Variable;
  readonly body: Formula;
}

export interface Clues {
  readonly steps: readonly Step[];
  readonly witnesses: readonly Witness[];
  /**
   * By relation, sign and two of its places, as {@link partnerKey} writes them: how often axioms say that for an element
   * at the first place there is one at the second.
   */
  readonly partners: ReadonlyMap<string, number>;
  /**
   * Whether some axiom says that for all elements there are others. If none does and there is a model at all, then there
   * is a finite one (Bernays & Schönfinkel 1928; with identity Ramsey 1930).
   */
  readonly hasSteps: boolean;
}

export function partnerKey(
  { name }: RelationSymbol,
  isPositive: boolean,
  first: number,
  second: number,
): string {
  return `${isPositive ? "+" : "-"}${name} ${first} ${second}`;
}

/** Parts of one axiom that are looked at; the others give no clues. */
const MOST_PARTS = 2_000;

export function cluesOf(axioms: readonly Formula[]): Clues {
  const collector = new Collector();
  for (const axiom of axioms) collector.collect(axiom);
  return collector;
}

/** The negation, with ¬ moved inside as far as no part is doubled. */
export function negated(formula: Formula): Formula {
  switch (formula.kind) {
    case "not":
      return formula.body;
    case "and":
      return or(...formula.parts.map(negated));
    case "or":
      return and(...formula.parts.map(negated));
    case "implies":
      return and(formula.left, negated(formula.right));
    case "forall":
      return { kind: "exists", variable: formula.variable, body: negated(formula.body) };
    case "exists":
      return { kind: "forall", variable: formula.variable, body: negated(formula.body) };
    default:
      return not(formula);
  }
}

/** Where a part of an axiom stands. */
interface Place {
  readonly isPositive: boolean;
  readonly witness: Witness | null;
  /** Variables in scope, innermost first, and whether they are for elements that are said to exist. */
  readonly scope: readonly { readonly variable: Variable; readonly isSome: boolean }[];
  /** The part is said to hold if all of these do. */
  readonly guard: readonly Formula[];
}

class Collector implements Clues {
  readonly steps: Step[] = [];
  readonly witnesses: Witness[] = [];
  readonly partners = new Map<string, number>();
  hasSteps = false;
  #left = 0;

  collect(axiom: Formula): void {
    this.#left = MOST_PARTS;
    this.#walk(axiom, { isPositive: true, witness: null, scope: [], guard: [] });
  }

  #walk(formula: Formula, place: Place): void {
    this.#left -= 1;
    if (this.#left < 0) {
      this.hasSteps = true;
      return;
    }
    const { isPositive, guard } = place;
    const signed = (part: Formula, sign: boolean) => (sign ? part : negated(part));
    /** A part of a conjunction. */
    const walk = (part: Formula, sign = isPositive) => this.#walk(part, { ...place, isPositive: sign });
    /** A part of a disjunction, the others being false. */
    const walkBeside = (part: Formula, sign: boolean, others: readonly Formula[]) =>
      this.#walk(part, { ...place, isPositive: sign, guard: [...guard, ...others] });
    switch (formula.kind) {
      case "atom":
        this.#see(formula, place);
        return;
      case "not":
        walk(formula.body, !isPositive);
        return;
      case "and":
      case "or":
        for (const part of formula.parts)
          if ((formula.kind === "and") === isPositive) walk(part);
          else
            walkBeside(
              part,
              isPositive,
              formula.parts.flatMap((other) => (other === part ? [] : [signed(other, !isPositive)])),
            );
        return;
      case "implies":
        if (!isPositive) {
          walk(formula.left, true);
          walk(formula.right, false);
          return;
        }
        walkBeside(formula.right, true, [formula.left]);
        walkBeside(formula.left, false, [negated(formula.right)]);
        return;
      case "iff": {
        const { left, right } = formula;
        for (const [one, other] of [
          [left, right],
          [right, left],
        ] as const)
          for (const sign of [true, false]) walkBeside(one, sign, [signed(other, isPositive === sign)]);
        return;
      }
      case "forall":
      case "exists":
        this.#walkQuantified(formula, place);
        return;
      default:
    }
  }

  #walkQuantified(formula: Formula & { kind: "forall" | "exists" }, place: Place): void {
    const { isPositive, scope, guard, witness } = place;
    const isSome = (formula.kind === "exists") === isPositive;
    if (isSome) {
      if (scope.some((one) => !one.isSome)) this.hasSteps = true;
      if (scope.length === 0 && guard.length === 0 && witness === null) {
        const found = witnessOf(isPositive ? formula : negated(formula));
        this.witnesses.push(found);
        this.#walk(found.given, { ...place, isPositive: true, witness: found });
        return;
      }
      if (scope.every((one) => !one.isSome)) this.#addSteps(isPositive ? formula : negated(formula), place);
    }
    this.#walk(formula.body, { ...place, scope: [{ variable: formula.variable, isSome }, ...scope] });
  }

  #addSteps(formula: Formula, { witness, scope, guard }: Place): void {
    if (formula.kind !== "exists") return;
    const { variable: to, body } = formula;
    const outer = [...new Set(scope.map(({ variable }) => variable))].reverse();
    const add = (one: Variable, rest: Formula) =>
      this.steps.push({
        witness,
        from: outer.filter((other) => other !== one),
        guard: and(...guard),
        to: one,
        body: rest,
      });
    add(to, body);
    // Of two ∃ next to each other, each may be the step.
    if (body.kind === "exists" && body.variable !== to) add(body.variable, exists(to, body.body));
  }

  #see({ relation, args }: Atom, { isPositive, scope }: Place): void {
    const bound = args.map((arg) => scope.findIndex(({ variable }) => variable === arg));
    for (const [second, inner] of bound.entries()) {
      if (inner < 0 || !scope[inner]!.isSome) continue;
      for (const [first, outer] of bound.entries()) {
        if (outer <= inner) continue;
        const key = partnerKey(relation, isPositive, first, second);
        this.partners.set(key, (this.partners.get(key) ?? 0) + 1);
      }
    }
  }
}

/** What outer ∃ say. Names that parameters can have are kept, so that the axiom itself says that there are such elements. */
function witnessOf(axiom: Formula): Witness {
  const taken = new Set(variablesOf(axiom));
  const renaming = new Map<Variable, Variable>();
  let inner = axiom;
  while (inner.kind === "exists" && !renaming.has(inner.variable)) {
    const name = parameterName(inner.variable, taken);
    taken.add(name);
    renaming.set(inner.variable, name);
    inner = inner.body;
  }
  return { parameters: [...renaming.values()], given: substitute(inner, renaming) };
}

/** The same name if principles do not use it themselves, else a new one. */
function parameterName(like: Variable, taken: ReadonlySet<Variable>): Variable {
  if (!/^[u-z]/.test(like)) return like;
  for (const letter of "abcdefghijklmnopqrst") if (!taken.has(letter)) return letter;
  return freshVariable("a", taken);
}
