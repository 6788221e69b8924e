/**
 * The search for a reason why a theory has no finite model: candidates in turn, the obligations of each derived with few
 * clauses first and with more later. Where a model is known, all that is false in it falls away without a derivation.
 */
import type { Structure } from "../../carriers/structure.ts";
import type { Derivation, DerivationTask } from "../../derivation/derive.ts";
import { DerivationSearch } from "../../derivation/turns.ts";
import type { Formula, RelationSymbol } from "../../logic/formula.ts";
import type { Meter } from "../../logic/meter.ts";
import type { ObligationKind } from "../../logic/records/finiteness.ts";
import { recordFormula } from "../../logic/records/formulas.ts";
import type { Signature } from "../../logic/theory.ts";
import { Solver } from "../../structures/sat/solver.ts";
import { Candidates, everywhere, type Family } from "./candidates.ts";
import { Filter } from "./filter.ts";
import { type FinitenessReason, type Obligation, obligationsFor } from "./reason.ts";
import { LONG, MIDDLE, OBLIGATION_TURNS, SHORT } from "./turns.ts";

export type { FinitenessReason } from "./reason.ts";

export interface NoFiniteModel {
  readonly reason: FinitenessReason;
  /**
   * What the reason asks for, in its order, each an axiom or derived. When the axioms are found to contradict each
   * other, there is just one, and its derivation does not use the conclusion.
   */
  readonly obligations: readonly ShownObligation[];
}
export interface ShownObligation {
  readonly formula: Formula;
  /** What it says, for people: "it is transitive there". */
  readonly role: string;
  /** Null when the very same sentence is an axiom. */
  readonly derived: { readonly task: DerivationTask; readonly derivation: Derivation } | null;
}

type Segment = "steps" | "likely" | "parts" | "sure" | "special" | "unlikely" | "restricted" | "rare";

/** Going through candidates of one kind, with so many clauses for each obligation. */
interface Pass {
  readonly level: number;
  readonly segment: Segment;
  readonly clauses: number;
}

/** In a pass, an obligation that was given up before is begun again, since keeping all searches would take memory. */
const PASSES: readonly Pass[] = [
  { level: 0, segment: "steps", clauses: SHORT },
  { level: 0, segment: "likely", clauses: SHORT },
  { level: 0, segment: "steps", clauses: 600 },
  { level: 0, segment: "parts", clauses: SHORT },
  { level: 1, segment: "special", clauses: SHORT },
  { level: 1, segment: "likely", clauses: MIDDLE },
  { level: 1, segment: "parts", clauses: MIDDLE },
  { level: 2, segment: "special", clauses: LONG },
  { level: 2, segment: "rare", clauses: LONG },
  { level: 2, segment: "likely", clauses: LONG },
  { level: 2, segment: "sure", clauses: SHORT },
  { level: 2, segment: "parts", clauses: LONG },
  { level: 2, segment: "unlikely", clauses: SHORT },
  { level: 3, segment: "unlikely", clauses: MIDDLE },
  { level: 3, segment: "restricted", clauses: SHORT },
  { level: 3, segment: "rare", clauses: 1_000 },
  { level: 3, segment: "likely", clauses: 1_000 },
  { level: 3, segment: "special", clauses: 1_000 },
  { level: 3, segment: "parts", clauses: 1_000 },
  { level: 3, segment: "sure", clauses: LONG },
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
  { level: 5, segment: "sure", clauses: 20_000 },
  { level: 5, segment: "unlikely", clauses: 20_000 },
  { level: 5, segment: "restricted", clauses: 20_000 },
  { level: 5, segment: "rare", clauses: 20_000 },
];

/** Thousandths of a step for looking at a candidate. */
const LOOK = 200;

/** A reason that is tried. */
interface Attempt {
  readonly reason: FinitenessReason;
  /** For each obligation. */
  readonly clauses: number;
  /** Whether only what is asked of φ is to be derived, to see whether φ is worth trying on parts of the elements. */
  readonly ofRelation: boolean;
}

/** A sentence that reasons ask for. */
interface Goal {
  readonly formula: Formula;
  state: "open" | "axiom" | "derived" | "refuted";
  /** When it was derived. */
  derivation: Derivation | null;
  /** Clauses that were generated for it in vain. */
  spent: number;
}

/** What is asked of φ alone. */
const OF_RELATION: ReadonlySet<ObligationKind> = new Set(["irreflexive", "transitive", "predecessors"]);

/** Obligations in the order in which they are derived: what fails soonest and what candidates share come first. */
const ORDER: readonly ObligationKind[] = [
  "parameters",
  "size",
  "successors",
  "irreflexive",
  "spare",
  "predecessors",
  "transitive",
  "values",
];

/** The search for one theory. The same theory has the same outcome, however the steps are handed out. */
export class FinitenessSearch {
  /** Reasons that were tried. */
  tried = 0;
  readonly #axioms: readonly Formula[];
  readonly #signature: Signature;
  readonly #symbols: ReadonlyMap<string, RelationSymbol>;
  /** By text. */
  readonly #goals = new Map<string, Goal>();
  readonly #filter = new Filter();
  #candidates: Candidates | null = null;
  /** How many passes are finished. */
  #passes = 0;
  /** The rest of the pass that was begun. */
  #attempts: Iterator<Attempt, undefined> | null = null;
  /** What was begun and could not be finished. */
  #unfinished: Attempt | null = null;
  #derivation: { readonly goal: Goal; readonly search: DerivationSearch } | null = null;

  /**
   * @param axioms closed
   * @param signature that of the axioms
   */
  constructor(axioms: readonly Formula[], signature: Signature) {
    this.#axioms = axioms;
    this.#signature = signature;
    this.#symbols = new Map(signature.relations.map((relation) => [relation.name, relation]));
    for (const formula of axioms)
      this.#goals.set(textOf(formula), { formula, state: "axiom", derivation: null, spent: 0 });
  }

  /** Whether all levels are finished. */
  get isExhausted(): boolean {
    return this.#passes === PASSES.length;
  }

  /**
   * Goes on from where it was, to the end of a level. Levels are of growing effort, from 0.
   * @param model in which all axioms are true and that interprets the whole signature; null when none is known
   * @returns null when there is nothing on these levels
   * @throws WorkEnded when the meter ends; the next call goes on with the same reason
   */
  advance(level: number, meter: Meter, model: Structure | null): NoFiniteModel | null {
    for (; this.#passes < PASSES.length; this.#passes += 1) {
      const pass = PASSES[this.#passes]!;
      if (pass.level > level) break;
      this.#attempts ??= this.#attemptsOf(pass);
      const found = this.#finishPass(this.#attempts, meter, model);
      if (found !== null) return found;
      this.#attempts = null;
    }
    return null;
  }

  #finishPass(attempts: Iterator<Attempt, undefined>, meter: Meter, model: Structure | null) {
    for (;;) {
      const attempt = this.#unfinished ?? attempts.next().value;
      if (attempt === undefined) return null;
      this.#unfinished = attempt;
      const found = this.#try(attempt, meter, model);
      this.#unfinished = null;
      this.tried += 1;
      if (found !== null) return found;
    }
  }

  *#attemptsOf({ segment, clauses }: Pass): Generator<Attempt, undefined> {
    this.#candidates ??= new Candidates(this.#axioms, this.#signature);
    const candidates = this.#candidates;
    if (!candidates.areAny) return;
    const attempt = (reason: FinitenessReason): Attempt => ({ reason, clauses, ofRelation: false });
    switch (segment) {
      case "likely":
      case "unlikely":
      case "rare":
        for (const family of candidates[segment]) yield attempt(everywhere(family));
        return;
      case "steps":
      case "special":
        for (const reason of candidates[segment]) yield attempt(reason);
        return;
      case "restricted":
        for (const reason of candidates.restricted()) yield attempt(reason);
        return;
      case "parts":
        for (const families of candidates.alternatives) yield* this.#onParts(families, clauses);
        return;
      case "sure":
        for (const family of candidates.sure) yield* this.#onParts([family], clauses);
        return;
    }
  }

  /** Of some families, the first whose φ is as its principle asks of all elements, on parts of them. */
  *#onParts(families: readonly Family[], clauses: number): Generator<Attempt, undefined> {
    for (const family of families) {
      const reason = everywhere(family);
      yield { reason, clauses, ofRelation: true };
      const asked = obligationsFor(reason, this.#symbols)?.filter(({ kind }) => OF_RELATION.has(kind));
      if (asked?.every(({ formula }) => isShown(this.#goal(formula))) !== true) continue;
      for (const part of this.#candidates!.onParts(family))
        yield { reason: part, clauses, ofRelation: false };
      return;
    }
  }

  #try(
    { reason, clauses, ofRelation }: Attempt,
    meter: Meter,
    model: Structure | null,
  ): NoFiniteModel | null {
    meter.charge(LOOK);
    const obligations = obligationsFor(reason, this.#symbols);
    if (obligations === null) return null;
    const asked = obligations
      .filter(({ kind }) => !ofRelation || OF_RELATION.has(kind))
      .map((obligation) => ({ obligation, goal: this.#goal(obligation.formula) }));
    // What cannot be derived with so many clauses, or at all, is seen before anything is derived.
    if (asked.some(({ goal }) => !isShown(goal) && !this.#isHopeful(goal, clauses, meter, model)))
      return null;
    const inOrder = [...asked].sort(
      (a, b) => ORDER.indexOf(a.obligation.kind) - ORDER.indexOf(b.obligation.kind),
    );
    for (const { obligation, goal } of inOrder) {
      if (!isShown(goal)) this.#derive(goal, clauses, meter);
      if (!isShown(goal)) return null;
      if (goal.derivation?.usesConclusion === false)
        return { reason, obligations: [this.#show(obligation, goal)] };
    }
    if (ofRelation) return null;
    return { reason, obligations: asked.map(({ obligation, goal }) => this.#show(obligation, goal)) };
  }

  #isHopeful(goal: Goal, clauses: number, meter: Meter, model: Structure | null): boolean {
    if (goal.state === "refuted" || goal.spent >= clauses) return false;
    if (model !== null && this.#filter.isFalse(model, goal.formula, meter)) goal.state = "refuted";
    return goal.state === "open";
  }

  #derive(goal: Goal, clauses: number, meter: Meter): void {
    const begun = this.#derivation?.goal === goal ? this.#derivation.search : null;
    const search =
      begun ??
      new DerivationSearch(
        this.#task(goal),
        (onDerived) => new Solver({ observer: { onDerived } }),
        OBLIGATION_TURNS,
      );
    this.#derivation = { goal, search };
    while (goal.state === "open" && search.generated < clauses) {
      const outcome = search.next(meter);
      if (outcome.result === "derived") {
        goal.state = "derived";
        goal.derivation = outcome.derivation;
      } else if (outcome.result === "saturated") goal.state = "refuted";
    }
    goal.spent = search.generated;
    this.#derivation = null;
  }

  #goal(formula: Formula): Goal {
    const text = textOf(formula);
    let goal = this.#goals.get(text);
    if (goal === undefined) {
      goal = { formula, state: "open", derivation: null, spent: 0 };
      this.#goals.set(text, goal);
    }
    return goal;
  }

  #task({ formula }: Goal): DerivationTask {
    return { premises: this.#axioms, conclusion: formula };
  }

  #show({ formula, role }: Obligation, goal: Goal): ShownObligation {
    const { derivation } = goal;
    return { formula, role, derived: derivation === null ? null : { task: this.#task(goal), derivation } };
  }
}

function isShown({ state }: Goal): boolean {
  return state === "axiom" || state === "derived";
}

/** As evidence sees a sentence: names of variables included. */
function textOf(formula: Formula): string {
  return JSON.stringify(recordFormula(formula));
}
