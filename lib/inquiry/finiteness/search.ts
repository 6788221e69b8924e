/** The search for a reason why a theory has no finite model. */
import type { Structure } from "../../carriers/structure.ts";
import type { Derivation, DerivationTask } from "../../derivation/derive.ts";
import { DerivationSearch } from "../../derivation/turns.ts";
import type { Formula, RelationSymbol } from "../../logic/formula.ts";
import { type Meter, WorkEnded } from "../../logic/meter.ts";
import { recordFormula } from "../../logic/records/formulas.ts";
import type { Signature } from "../../logic/theory.ts";
import { Solver } from "../../structures/sat/solver.ts";
import { type Candidate, candidatesOf, type Tier } from "./candidates.ts";
import { cluesOf } from "./clues.ts";
import { isTrueIn } from "./filter.ts";
import { type FinitenessReason, type Obligation, type ObligationKind, obligationsFor } from "./reason.ts";

export type { FinitenessReason } from "./reason.ts";

export interface NoFiniteModel {
  readonly reason: FinitenessReason;
  /** What the reason asks for, in its order, each an axiom or derived. */
  readonly obligations: readonly ShownObligation[];
}
export interface ShownObligation {
  readonly formula: Formula;
  /** What it says, for people: "it is transitive there". */
  readonly role: string;
  /** Null when the very same sentence is an axiom. */
  readonly spent?: number;
  readonly derived: { readonly task: DerivationTask; readonly derivation: Derivation } | null;
}

interface Pass {
  readonly level: number;
  readonly tiers: Tier;
  readonly clauses: number;
}

const PASSES: readonly Pass[] = [
  { level: 0, tiers: 0, clauses: 60 },
  { level: 1, tiers: 1, clauses: 60 },
  { level: 1, tiers: 0, clauses: 300 },
  { level: 2, tiers: 2, clauses: 300 },
  { level: 3, tiers: 1, clauses: 1_000 },
  { level: 4, tiers: 3, clauses: 2_000 },
  { level: 5, tiers: 3, clauses: 20_000 },
];

/** An obligation of some reasons. */
interface Goal {
  readonly formula: Formula;
  readonly isAxiom: boolean;
  derivation: Derivation | null;
  /** Whether it is known not to follow. */
  isRefuted: boolean;
  /** Clauses that were generated in vain. */
  spent: number;
  /** The last structure in which it is known to be true, or could not be evaluated. */
  seen: Structure | null;
}

export class FinitenessSearch {
  /** Reasons tried. */
  tried = 0;
  readonly #axioms: readonly Formula[];
  readonly #symbols: ReadonlyMap<string, RelationSymbol>;
  readonly #signature: Signature;
  readonly #goals = new Map<string, Goal>();
  readonly #known: ReadonlySet<string>;
  #candidates: readonly Candidate[] | null = null;
  #pass = 0;
  #next = 0;
  /** The search that was begun and could not be finished. */
  #unfinished: { readonly goal: Goal; readonly search: DerivationSearch } | null = null;
  readonly #obligations = new Map<FinitenessReason, readonly Obligation[] | null>();

  constructor(axioms: readonly Formula[], signature: Signature) {
    this.#axioms = axioms;
    this.#signature = signature;
    this.#symbols = new Map(signature.relations.map((relation) => [relation.name, relation]));
    this.#known = new Set(axioms.map((axiom) => JSON.stringify(recordFormula(axiom))));
  }

  get isExhausted(): boolean {
    return this.#pass >= PASSES.length;
  }

  advance(level: number, meter: Meter, model: Structure | null): NoFiniteModel | null {
    this.#candidates ??= this.#list();
    for (
      ;
      this.#pass < PASSES.length && PASSES[this.#pass]!.level <= level;
      this.#pass += 1, this.#next = 0
    ) {
      const pass = PASSES[this.#pass]!;
      for (; this.#next < this.#candidates.length; this.#next += 1) {
        const candidate = this.#candidates[this.#next]!;
        if (candidate.tier > pass.tiers) continue;
        this.tried += 1;
        const found = this.#try(candidate, pass, meter, model);
        if (found !== null) return found;
      }
    }
    return null;
  }

  #list(): readonly Candidate[] {
    const clues = cluesOf(this.#axioms);
    return clues.hasExistence ? candidatesOf(this.#signature, clues) : [];
  }

  #try(
    { reason, wider }: Candidate,
    pass: Pass,
    meter: Meter,
    model: Structure | null,
  ): NoFiniteModel | null {
    meter.charge(100);
    if (wider !== null && pass.clauses <= 1_000) {
      const own = this.#obligationsOf(wider)?.filter(({ kind }) => OF_RELATION.has(kind)) ?? [];
      if (!own.every(({ formula }) => this.#derive(this.#goal(formula), pass.clauses, meter, null)))
        return null;
    }
    const obligations = this.#obligationsOf(reason);
    if (obligations === null) return null;
    const goals = obligations.map(({ formula }) => this.#goal(formula));
    if (goals.some((goal) => goal.isRefuted)) return null;
    if (model !== null && !goals.every((goal) => this.#passes(goal, meter, model))) return null;
    const order = [...goals.keys()].sort((a, b) => RANK[obligations[a]!.kind] - RANK[obligations[b]!.kind]);
    if (!order.every((place) => this.#derive(goals[place]!, pass.clauses, meter, model))) return null;
    return {
      reason,
      obligations: obligations.map(({ formula, role }, place) => {
        const { derivation, spent } = goals[place]!;
        return { formula, role, spent, derived: derivation === null ? null : { task: this.#task(formula), derivation },
        };
      }),
    };
  }

  #obligationsOf(reason: FinitenessReason): readonly Obligation[] | null {
    let known = this.#obligations.get(reason);
    if (known === undefined) {
      known = obligationsFor(reason, this.#symbols);
      this.#obligations.set(reason, known);
    }
    return known;
  }

  #goal(formula: Formula): Goal {
    const text = JSON.stringify(recordFormula(formula));
    let goal = this.#goals.get(text);
    if (goal === undefined) {
      goal = {
        formula,
        isAxiom: this.#known.has(text),
        derivation: null,
        isRefuted: false,
        spent: 0,
        seen: null,
      };
      this.#goals.set(text, goal);
    }
    return goal;
  }

  #passes(goal: Goal, meter: Meter, model: Structure): boolean {
    if (goal.isRefuted) return false;
    if (goal.isAxiom || goal.derivation !== null || goal.seen === model) return true;
    if (isTrueIn(model, goal.formula, meter) === false) goal.isRefuted = true;
    goal.seen = model;
    return !goal.isRefuted;
  }

  #task(conclusion: Formula): DerivationTask {
    return { premises: this.#axioms, conclusion };
  }

  #derive(goal: Goal, clauses: number, meter: Meter, model: Structure | null): boolean {
    if (goal.isAxiom || goal.derivation !== null) return true;
    if (goal.isRefuted || goal.spent >= clauses) return false;
    if (model !== null && !this.#passes(goal, meter, model)) return false;
    let search = this.#unfinished?.goal === goal ? this.#unfinished.search : null;
    search ??= new DerivationSearch(
      this.#task(goal.formula),
      (onDerived) => new Solver({ observer: { onDerived } }),
    );
    this.#unfinished = { goal, search };
    while (search.generated < clauses) {
      const outcome = search.next(meter);
      if (outcome.result === "derived") {
        goal.derivation = outcome.derivation;
        break;
      }
      if (outcome.result === "saturated") {
        goal.isRefuted = true;
        break;
      }
    }
    this.#unfinished = null;
    goal.spent = search.generated;
    return goal.derivation !== null;
  }
}

/** Obligations about a relation alone. */
const OF_RELATION: ReadonlySet<ObligationKind> = new Set(["irreflexive", "transitive", "predecessors"]);

const RANK: Readonly<Record<ObligationKind, number>> = {
  parameters: 0,
  size: 1,
  irreflexive: 3,
  successors: 2,
  spare: 3,
  predecessors: 4,
  transitive: 4,
  values: 5,
};
void WorkEnded;
