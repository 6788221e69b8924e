/**
 * What axioms show about where a reason may be found: which relations they give partners in, which steps they make
 * from elements to others, and which elements they say exist. Only the order of trying depends on it, and what is tried.
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
import { toSimpleNegationForm } from "../../logic/normal-forms/prepare.ts";
import { FormTooLarge } from "../../logic/normal-forms/result.ts";
import { StepRecorder } from "../../logic/normal-forms/steps.ts";
import type { Witness } from "./reason.ts";

/** ∀ `from` (`guard` → ∃ `to` `body`), as an axiom says. */
export interface Step {
  readonly from: readonly Variable[];
  readonly guard: Formula;
  readonly to: Variable;
  readonly body: Formula;
}

export interface Clues {
  readonly steps: readonly Step[];
  readonly witnesses: readonly Witness[];
  /**
   * By relation, sign and two of its places, as {@link partnerKey} writes them: how often an axiom says that for an
   * element at the first there is one at the second.
   */
  readonly partners: ReadonlyMap<string, number>;
  /** Whether some axiom says that something exists. If none does, one element by itself is a model, or there is none. */
  readonly hasExistence: boolean;
}

export function partnerKey(
  { name }: RelationSymbol,
  isPositive: boolean,
  first: number,
  second: number,
): string {
  return `${isPositive ? "+" : "-"}${name} ${first} ${second}`;
}

/** Parts of a negation normal form that is looked at; axioms that would have more give no clues. */
const MOST_PARTS = 5_000;
const LIMITS = { parts: MOST_PARTS, levels: 1_000 };

export function cluesOf(axioms: readonly Formula[]): Clues {
  const collector = new Collector();
  for (const axiom of axioms) {
    const normal = simpleForm(axiom);
    if (normal === null) {
      collector.hasExistence = true;
      continue;
    }
    collector.witnessesOf(normal, axiom);
    collector.walk(normal, [], []);
    collector.look(normal, []);
  }
  return collector;
}

function simpleForm(formula: Formula): Formula | null {
  try {
    return toSimpleNegationForm(formula, LIMITS, new StepRecorder(false));
  } catch (problem) {
    if (problem instanceof FormTooLarge) return null;
    throw problem;
  }
}

/** The negation, without double ones. */
export function negated(formula: Formula): Formula {
  switch (formula.kind) {
    case "not":
      return formula.body;
    case "and":
      return or(...formula.parts.map(negated));
    case "or":
      return and(...formula.parts.map(negated));
    case "forall":
      return { kind: "exists", variable: formula.variable, body: negated(formula.body) };
    case "exists":
      return { kind: "forall", variable: formula.variable, body: negated(formula.body) };
    default:
      return not(formula);
  }
}

class Collector implements Clues {
  readonly steps: Step[] = [];
  readonly witnesses: Witness[] = [];
  readonly partners = new Map<string, number>();
  hasExistence = false;

  /** Outer ∃ of a formula, also where they stand in a conjunction. */
  witnessesOf(normal: Formula, written: Formula): void {
    if (normal.kind === "and") for (const part of normal.parts) this.witnessesOf(part, part);
    if (normal.kind !== "exists") return;
    // As it is written, so that what exists is an axiom as it stands.
    let body: Formula = written.kind === "exists" ? written : normal;
    const names: Variable[] = [];
    const renaming = new Map<Variable, Variable>();
    let inner: Formula = body;
    while (inner.kind === "exists") {
      if (renaming.has(inner.variable)) return;
      const name = parameterName(inner.variable, new Set([...names, ...variablesOf(written)]));
      names.push(name);
      renaming.set(inner.variable, name);
      inner = inner.body;
    }
    body = substitute(inner, renaming);
    this.witnesses.push({ parameters: names, given: body });
  }

  /** Collects steps. */
  walk(formula: Formula, from: readonly Variable[], guard: readonly Formula[]): void {
    switch (formula.kind) {
      case "forall":
        this.walk(formula.body, [...from, formula.variable], guard);
        return;
      case "and":
        for (const part of formula.parts) this.walk(part, from, guard);
        return;
      case "or":
        for (const part of formula.parts) {
          const others = formula.parts.filter((other) => other !== part);
          this.walk(part, from, [...guard, ...others.map(negated)]);
        }
        return;
      case "exists": {
        const { variable: to, body } = formula;
        const distinct = [...new Set(from)].filter((one) => one !== to);
        this.steps.push({ from: distinct, guard: and(...guard), to, body });
        // Of two ∃ next to each other, each may be the step.
        if (body.kind === "exists" && body.variable !== to)
          this.steps.push({
            from: distinct.filter((one) => one !== body.variable),
            guard: and(...guard),
            to: body.variable,
            body: exists(to, body.body),
          });
        return;
      }
      default:
    }
  }

  /** Collects partners. */
  look(formula: Formula, scope: readonly { readonly variable: Variable; readonly isSome: boolean }[]): void {
    switch (formula.kind) {
      case "forall":
      case "exists": {
        const isSome = formula.kind === "exists";
        if (isSome) this.hasExistence = true;
        this.look(formula.body, [{ variable: formula.variable, isSome }, ...scope]);
        return;
      }
      case "and":
      case "or":
        for (const part of formula.parts) this.look(part, scope);
        return;
      case "not":
        if (formula.body.kind === "atom") this.#partners(formula.body, false, scope);
        return;
      case "atom":
        this.#partners(formula, true, scope);
        return;
      default:
    }
  }

  #partners(
    { relation, args }: Atom,
    isPositive: boolean,
    scope: readonly { readonly variable: Variable; readonly isSome: boolean }[],
  ): void {
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

/** Variables that elements and inner quantifiers of principles are called by. */
const KEPT = new Set(["x", "y", "z", "w", "u", "v"]);

/** The same name if it can be a parameter's, else a new one. */
function parameterName(like: Variable, taken: ReadonlySet<Variable>): Variable {
  if (!KEPT.has(like) && !/^[xyzwuv]/.test(like)) return like;
  for (const letter of "abcdefghijklmnopqrst") if (!taken.has(letter)) return letter;
  return freshVariable("a", taken);
}
