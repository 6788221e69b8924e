/** Going through the turns of a search for a derivation, one at a time, so that other searches can go between. */
import type { TermFormulaRecord } from "../evidence/format.ts";
import { type Meter, WorkEnded } from "../logic/meter.ts";
import { recordFormula } from "../logic/records/formulas.ts";
import { MeterShare } from "../logic/share.ts";
import { hasCases } from "./cases.ts";
import { type DerivationTask, prepareTurn, runTurn, type Turn, type TurnOutcome } from "./derive.ts";
import { explicitDefinition } from "./explicit.ts";
import type { CreateSolver } from "./ground-solver.ts";
import type { Prepared } from "./prepare.ts";
import { ENDLESS_TURNS, GROWTH, type PlannedTurn, TURNS, turnsOf } from "./schedule.ts";

export type { CreateSolver } from "./ground-solver.ts";
export { TURNS } from "./schedule.ts";

/** A turn may spend so many times its clauses in steps, for work that makes no clauses. */
const STEPS_A_CLAUSE = 2;

/**
 * The search for one derivation: first the fixed list of turns, then some of them again and again with more clauses. The
 * same task has the same outcome at the same turn, however the steps are handed out.
 */
export class DerivationSearch {
  /** Steps spent: the clauses that were generated. */
  generated = 0;
  readonly #task: DerivationTask;
  readonly #createSolver: CreateSolver;
  readonly #turns: Iterator<Turn, never>;
  /** The turn that comes next, when one was begun and could not be finished. */
  #unfinished: Turn | null = null;
  /** By preparation; null where there would be too many clauses. */
  /** Whether there is anything to unfold. */
  readonly #hasDefinitions: boolean;
  readonly #prepared = new Map<string, PreparedOnce | null>();
  /** By clauses and engine: how many clauses were generated without an answer. */
  readonly #done = new Map<string, number>();
  #outcome: TurnOutcome | null = null;
  /** Turns passed over since one was run. */
  #passedOver = 0;
  /** Whether some turn met its bound on memory. */
  #metMemory = false;

  /** @param first the turns to begin with, before those that come again and again */
  constructor(task: DerivationTask, createSolver: CreateSolver, first: readonly PlannedTurn[] = TURNS) {
    this.#task = task;
    this.#createSolver = createSolver;
    this.#turns = allTurns(task, first);
    this.#hasDefinitions = task.premises.some(
      (premise) => explicitDefinition(recordFormula(premise) as TermFormulaRecord, 0) !== null,
    );
  }

  /** Whether there is an answer; {@link next} gives it again. */
  get done(): boolean {
    return this.#outcome !== null;
  }

  /**
   * Runs the next turn that is not pointless. `derived` and `saturated` are final.
   * @throws WorkEnded when the meter ends before the turn does; the turn will be begun again
   */
  next(meter: Meter): TurnOutcome {
    if (this.#outcome !== null) return this.#outcome;
    for (;;) {
      const turn = this.#unfinished ?? this.#turns.next().value;
      this.#unfinished = turn;
      const outcome = this.#run(turn, meter);
      this.#unfinished = null;
      if (outcome === null) continue;
      if (outcome.result !== "gave-up") this.#outcome = outcome;
      return outcome;
    }
  }

  /** Null when nothing new can come of the turn. */
  #run(turn: Turn, meter: Meter): TurnOutcome | null {
    const once = this.#prepare(turn);
    if (once === null || !isWorthwhile(turn, once)) return this.#passOver(meter);
    const key = `${once.number} ${JSON.stringify(turn.engine)}`;
    if ((this.#done.get(key) ?? 0) >= turn.clauses) return this.#passOver(meter);
    this.#passedOver = 0;
    const outcome = this.#spend(turn, once.prepared, meter);
    const isFinished = outcome.result === "gave-up" && outcome.reason !== "steps";
    this.#done.set(key, isFinished ? Number.POSITIVE_INFINITY : turn.clauses);
    if (outcome.result === "gave-up" && outcome.reason === "memory") this.#metMemory = true;
    return outcome;
  }

  /** Costs more and more, so that there is an end where every turn has come to nothing. */
  #passOver(meter: Meter): null {
    this.#passedOver += 1;
    if (this.#passedOver > MOST_PASSED_OVER && this.#metMemory) meter.endForMemory();
    meter.charge(LOOK * this.#passedOver);
    return null;
  }

  #spend(turn: Turn, prepared: Prepared, meter: Meter): TurnOutcome {
    const wanted = turn.clauses * STEPS_A_CLAUSE;
    const share = new MeterShare(meter, wanted);
    try {
      return runTurn(this.#task, turn, prepared, share.meter, this.#createSolver);
    } catch (problem) {
      if (!(problem instanceof WorkEnded)) throw problem;
      share.settle();
      if (meter.ended !== null) throw new WorkEnded(meter.ended);
      // The whole could not give what the turn may spend: it has ended too, but for a fraction of a step.
      if (problem.reason === "budget" && share.meter.limit < wanted) throw problem;
      return { result: "gave-up", reason: problem.reason === "memory" ? "memory" : "steps" };
    } finally {
      share.settle();
      this.generated += share.meter.steps;
    }
  }

  #prepare({ preparation }: Turn): PreparedOnce | null {
    const own = { ...preparation, unfold: preparation.unfold && this.#hasDefinitions };
    const key = JSON.stringify(own);
    const known = this.#prepared.get(key);
    if (known !== undefined) return known;
    const prepared = prepareTurn(this.#task, own);
    if (prepared === null) {
      this.#prepared.set(key, null);
      return null;
    }
    const clauses = prepared.task.clauses.map(({ clause, goal }) => [clause, goal]);
    const text = JSON.stringify([prepared.isComplete, clauses]);
    const same = [...this.#prepared.values()].find((other) => other?.text === text);
    const once = same ?? {
      number: this.#prepared.size,
      text,
      prepared,
      hasOpposites: hasOpposites(prepared),
    };
    this.#prepared.set(key, once);
    return once;
  }
}

/** Thousandths of a step for a turn that is passed over. */
const LOOK = 100;
/** So many turns after each other passed over, and there is none that could be run. */
const MOST_PASSED_OVER = 200;

interface PreparedOnce {
  /** The same for turns with the same clauses. */
  readonly number: number;
  readonly text: string;
  readonly prepared: Prepared;
  /** Whether some atom occurs both negated and not. */
  readonly hasOpposites: boolean;
}

/** Whether letters leave anything to be found. */
function isWorthwhile({ preparation, engine }: Turn, once: PreparedOnce): boolean {
  if (engine.by === "cases") return hasCases(once.prepared.task);
  return preparation.letters === "none" || once.hasOpposites;
}

function hasOpposites({ task }: Prepared): boolean {
  const literals = new Set(task.clauses.flatMap(({ clause }) => clause.map((l) => JSON.stringify(l))));
  return task.clauses.some(
    ({ clause }) => clause.length === 0 || clause.some((l) => literals.has(JSON.stringify(["not", l]))),
  );
}

function* allTurns(task: DerivationTask, first: readonly PlannedTurn[]): Generator<Turn, never> {
  for (const plan of first) yield* turnsOf(plan, task);
  for (let factor = 1; ; factor *= GROWTH)
    for (const plan of ENDLESS_TURNS) yield* turnsOf({ ...plan, clauses: plan.clauses * factor }, task);
}
