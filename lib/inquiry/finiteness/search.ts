/** The search for a reason why a theory has no finite model. */
import type { Structure } from "../../carriers/structure.ts";
import type { Derivation, DerivationTask } from "../../derivation/derive.ts";
import { DerivationSearch } from "../../derivation/turns.ts";
import type { Formula, RelationSymbol } from "../../logic/formula.ts";
import { type Meter, WorkEnded } from "../../logic/meter.ts";
import { recordFormula } from "../../logic/records/formulas.ts";
import type { Signature } from "../../logic/theory.ts";
import { Solver } from "../../structures/sat/solver.ts";
import { Candidates, everywhere } from "./candidates.ts";
import { cluesOf } from "./clues.ts";
import { isTrueIn } from "./filter.ts";
import { type FinitenessReason, type Obligation, type ObligationKind, obligationsFor } from "./reason.ts";

import { LONG, MIDDLE, OBLIGATION_TURNS, SHORT } from "./turns.ts";

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

type Segment = "likely" | "parts" | "inclusions" | "special" | "unlikely" | "restricted" | "rare";

/** One kind of reasons, each obligation with so many clauses. */
interface Pass {
  readonly level: number;
  readonly segment: Segment;
  readonly clauses: number;
}

const PASSES: readonly Pass[] = [
  { level: 0, segment: "likely", clauses: SHORT },
  { level: 0, segment: "parts", clauses: SHORT },
  { level: 1, segment: "special", clauses: SHORT },
  { level: 1, segment: "likely", clauses: MIDDLE },
  { level: 1, segment: "parts", clauses: MIDDLE },
  { level: 2, segment: "special", clauses: LONG },
  { level: 2, segment: "inclusions", clauses: SHORT },
  { level: 2, segment: "unlikely", clauses: SHORT },
  { level: 2, segment: "likely", clauses: LONG },
  { level: 2, segment: "parts", clauses: LONG },
  { level: 3, segment: "unlikely", clauses: MIDDLE },
  { level: 3, segment: "restricted", clauses: SHORT },
  { level: 3, segment: "rare", clauses: LONG },
  { level: 3, segment: "likely", clauses: 1_000 },
  { level: 3, segment: "special", clauses: 1_000 },
  { level: 3, segment: "parts", clauses: 1_000 },
  { level: 3, segment: "inclusions", clauses: LONG },
  { level: 3, segment: "unlikely", clauses: LONG },
  { level: 4, segment: "restricted", clauses: LONG },
  { level: 4, segment: "likely", clauses: 3_000 },
  { level: 4, segment: "special", clauses: 3_000 },
  { level: 4, segment: "parts", clauses: 2_000 },
  { level: 4, segment: "unlikely", clauses: 1_000 },
  { level: 4, segment: "rare", clauses: 2_000 },
  { level: 5, segment: "likely", clauses: 20_000 },
  { level: 5, segment: "special", clauses: 20_000 },
  { level: 5, segment: "parts", clauses: 20_000 },
  { level: 5, segment: "inclusions", clauses: 20_000 },
  { level: 5, segment: "unlikely", clauses: 20_000 },
  { level: 5, segment: "restricted", clauses: 20_000 },
  { level: 5, segment: "rare", clauses: 20_000 },
];

interface Attempt {
  readonly reason: FinitenessReason;
  readonly clauses: number;
  /** Whether only what is asked of the relation is to be derived. */
  readonly isPartial: boolean;
}

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
  costs: Record<string, { steps: number; n: number }> = {};
  segment = "";
  readonly #axioms: readonly Formula[];
  readonly #symbols: ReadonlyMap<string, RelationSymbol>;
  readonly #signature: Signature;
  readonly #goals = new Map<string, Goal>();
  readonly #known: ReadonlySet<string>;
  #candidates: Candidates | null = null;
  #pass = 0;
  #attempts: Generator<Attempt> | null = null;
  #attempt: Attempt | null = null;
  /** The search that was begun and could not be finished. */
  #unfinished: { readonly goal: Goal; readonly search: DerivationSearch } | null = null;
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
    for (; this.#pass < PASSES.length && PASSES[this.#pass]!.level <= level; this.#pass += 1) {
      this.#attempts ??= this.#attemptsOf(PASSES[this.#pass]!);
      for (;;) {
        this.#attempt ??= this.#attempts.next().value ?? null;
        if (this.#attempt === null) break;
        const before = meter.left;
        const found = this.#try(this.#attempt, meter, model);
        const c = (this.costs[`${this.#pass} ${this.segment}`] ??= { steps: 0, n: 0 });
        c.steps += (before - meter.left) / 1000;
        c.n++;
        if (found !== null) return found;
        this.#attempt = null;
        this.tried += 1;
      }
      this.#attempts = null;
    }
    return null;
  }

  *#attemptsOf(pass: Pass): Generator<Attempt, undefined> {
    if (this.#candidates === null) {
      const clues = cluesOf(this.#axioms);
      if (!clues.hasExistence) return;
      this.#candidates = new Candidates(this.#signature, clues);
    }
    const candidates = this.#candidates;
    const { clauses } = pass;
    this.segment = pass.segment;
    switch (pass.segment) {
      case "likely":
      case "unlikely":
      case "rare":
        for (const family of candidates[pass.segment])
          yield { reason: everywhere(family), clauses, isPartial: false };
        return;
      case "special":
        for (const reason of candidates.special) yield { reason, clauses, isPartial: false };
        return;
      case "restricted":
        for (const reason of candidates.restricted()) yield { reason, clauses, isPartial: false };
        return;
      case "parts":
      case "inclusions": {
        const lists =
          pass.segment === "parts" ? candidates.alternatives : candidates.inclusions.map((one) => [one]);
        for (const families of lists)
          for (const family of families) {
            const reason = everywhere(family);
            yield { reason, clauses, isPartial: true };
            if (!this.#isAsAsked(reason)) continue;
            for (const part of candidates.onParts(family)) yield { reason: part, clauses, isPartial: false };
            break;
          }
      }
    }
  }

  #isAsAsked(reason: FinitenessReason): boolean {
    const obligations = this.#obligationsOf(reason) ?? [];
    return obligations.every(({ kind, formula }) => {
      if (!OF_RELATION.has(kind)) return true;
      const goal = this.#goal(formula);
      return goal.isAxiom || goal.derivation !== null;
    });
  }

  #try({ reason, clauses, isPartial }: Attempt, meter: Meter, model: Structure | null): NoFiniteModel | null {
    meter.charge(100);
    const obligations = this.#obligationsOf(reason);
    if (obligations === null) return null;
    const goals = obligations.map(({ formula }) => this.#goal(formula));
    if (isPartial) {
      obligations.every(
        ({ kind }, place) => !OF_RELATION.has(kind) || this.#derive(goals[place]!, clauses, meter, model),
      );
      return null;
    }
    if (goals.some((goal) => goal.isRefuted)) return null;
    if (model !== null && !goals.every((goal) => this.#passes(goal, meter, model))) return null;
    const order = [...goals.keys()].sort((a, b) => RANK[obligations[a]!.kind] - RANK[obligations[b]!.kind]);
    if (!order.every((place) => this.#derive(goals[place]!, clauses, meter, model))) return null;
    return {
      reason,
      obligations: obligations.map(({ formula, role }, place) => {
        const { derivation, spent } = goals[place]!;
        return {
          formula,
          role,
          spent,
          derived: derivation === null ? null : { task: this.#task(formula), derivation },
        };
      }),
    };
  }

  #obligationsOf(reason: FinitenessReason): readonly Obligation[] | null {
    return obligationsFor(reason, this.#symbols);
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
      OBLIGATION_TURNS,
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
