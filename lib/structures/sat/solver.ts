import type { Meter } from "../../logic/meter.ts";
import { analyse, blame } from "./analyse.ts";
import { Core, NONE, type ProofObserver } from "./core.ts";
import { type Enumeration, enumerateModels } from "./enumerate.ts";
import { pack, unpack } from "./literals.ts";
import { propagate } from "./propagate.ts";
import { reduce } from "./reduce.ts";
import { Restarts } from "./restarts.ts";

/** The bound on literals in clauses that is taken when none is given: about a gigabyte of clauses and watches. */
export const DEFAULT_MOST_LITERALS = 30_000_000;

/** Learned clauses are first reduced after as many conflicts … */
const FIRST_REDUCTION = 1000;
/** … and each time after so many more than the last time. */
const REDUCTION_STEP = 100;

/** `ended`: the meter's `ended` says why, and nothing is known. */
export type Outcome = "satisfiable" | "unsatisfiable" | "ended";

export interface SolverOptions {
  /** How many literals all clauses together may have, given and learned ones. */
  readonly mostLiterals?: number;
  /** Is told of every derived and deleted clause. */
  readonly observer?: ProofObserver;
}

export interface SolverCounts {
  readonly conflicts: number;
  readonly decisions: number;
  readonly propagations: number;
  /** Assignments and watched clauses looked at; a thousand are a step. */
  readonly visits: number;
  /** Literals in the clauses that are kept. */
  readonly literals: number;
}

/**
 * A solver for propositional clauses by conflict-driven clause learning: unit propagation by two watched literals
 * with blockers, clauses learned at the first unique implication point and minimised recursively, decisions by
 * activity (Moskewicz et al. 2001; Eén & Sörensson 2003) with saved phases, restarts and deletion of learned clauses
 * by the decision levels that they span (Audemard & Simon 2009). The other sources stand where the methods do.
 *
 * It is incremental: clauses and variables may be added between searches, and assumptions are forgotten afterwards.
 * It is deterministic: the same calls give the same answers, models, cores and counts.
 */
export class Solver {
  readonly #core: Core;

  // Result of the last search

  /** By variable: its value in the last model. */
  #model: Uint8Array = new Uint8Array(0);
  /** Assumptions that cannot hold together, signed. */
  #failed: readonly number[] = [];

  // Clauses to come

  /** By literal: the number of the last clause given that has it. Finds what occurs twice. */
  #occurs: Int32Array = new Int32Array(16);
  #clauses = 0;
  #scratch: Int32Array = new Int32Array(16);

  // State of the search that outlives one call

  readonly #restarts = new Restarts();
  /** Conflicts at which learned clauses are reduced next. */
  #nextReduction = FIRST_REDUCTION;
  #reductions = 0;

  constructor(options: SolverOptions = {}) {
    this.#core = new Core(options.mostLiterals ?? DEFAULT_MOST_LITERALS, options.observer ?? null);
  }

  // The problem

  get variableCount(): number {
    return this.#core.variables;
  }

  /** Makes room for so many more variables at once, which saves moving those there are again and again. */
  reserve(variables: number): void {
    this.#core.reserve(this.#core.variables + variables + 1);
  }

  /** Adds a variable; they are 1, 2, … */
  newVariable(): number {
    const variable = this.#core.newVariable();
    if (variable * 2 + 1 >= this.#occurs.length) this.#occurs = new Int32Array(variable * 8);
    return variable;
  }

  /**
   * Adds a clause of signed literals of existing variables; a literal may occur twice, and with its negation.
   * @returns false once the clauses are contradictory by unit propagation alone
   */
  addClause(literals: readonly number[]): boolean {
    const core = this.#core;
    if (!core.consistent) return false;
    if (literals.length > this.#scratch.length) this.#scratch = new Int32Array(literals.length * 2);
    const clause = this.#scratch;
    this.#clauses += 1;
    let length = 0;
    let shortened = false;
    for (const signed of literals) {
      const literal = pack(signed);
      if (!(literal >> 1 >= 1 && literal >> 1 <= core.variables))
        throw new RangeError(`no variable ${signed}`);
      const value = core.values[literal]!;
      if (value > 0 || this.#occurs[literal ^ 1] === this.#clauses) return true;
      if (value < 0) shortened = true;
      if (value < 0 || this.#occurs[literal] === this.#clauses) continue;
      this.#occurs[literal] = this.#clauses;
      clause[length++] = literal;
    }
    if (shortened && length > 0) core.noteDerived(clause, length);
    if (length === 0) core.contradict();
    else if (length === 1) {
      core.assign(clause[0]!, NONE);
      if (propagate(core) !== NONE) core.contradict();
    } else if (core.literals + length > core.mostLiterals) core.overfull = true;
    else core.keep(clause, length, 0);
    return core.consistent;
  }

  // Searches

  /**
   * Looks for an assignment that makes all clauses and all assumptions true.
   * @param meter pays for the visits
   * @param assumptions signed literals, for this search only
   */
  solve(meter: Meter, assumptions: readonly number[] = []): Outcome {
    const core = this.#core;
    this.#failed = [];
    if (!core.consistent) return "unsatisfiable";
    if (core.overfull) {
      meter.ended ??= "memory";
      return "ended";
    }
    core.reserveLevels(core.variables + assumptions.length + 2);
    core.meter = meter;
    core.stopped = meter.ended !== null;
    const outcome = core.stopped ? "ended" : this.#search(assumptions.map(pack));
    core.report();
    core.cancel(0);
    core.meter = null;
    return outcome;
  }

  /** The value of a variable in the model found by the last search, which must have been satisfiable. */
  value(variable: number): boolean {
    return this.#model[variable] === 1;
  }

  /**
   * After a search that was unsatisfiable: assumptions that cannot hold together with the clauses; none when the
   * clauses are contradictory by themselves.
   */
  core(): readonly number[] {
    return this.#failed;
  }

  /**
   * Finds all assignments to some variables that extend to a model, each once.
   * @param over the variables
   * @param onModel gets the values by position in `over`, 1 for true, in an array that is used again; returns
   *   whether to go on
   */
  enumerate(meter: Meter, over: readonly number[], onModel: (values: Uint8Array) => boolean): Enumeration {
    const core = this.#core;
    if (!core.consistent) return "complete";
    if (core.overfull) {
      meter.ended ??= "memory";
      return "ended";
    }
    core.reserveLevels(core.variables + 3);
    core.meter = meter;
    core.stopped = meter.ended !== null;
    const outcome = core.stopped ? "ended" : enumerateModels(core, over, onModel, () => this.#keepBounds());
    core.report();
    core.meter = null;
    return outcome;
  }

  get counts(): SolverCounts {
    const { conflicts, decisions, propagations, visits, literals } = this.#core;
    return { conflicts, decisions, propagations, visits, literals };
  }

  /** Searches at the levels above the assumptions, each of which has a level of its own. */
  #search(assumptions: readonly number[]): Outcome {
    const core = this.#core;
    for (;;) {
      const conflict = propagate(core);
      if (conflict !== NONE) {
        if (core.level === 0) {
          core.contradict();
          return "unsatisfiable";
        }
        this.#learn(conflict);
        if (!this.#keepBounds()) return "ended";
        continue;
      }
      if (core.stopped) return "ended";
      if (this.#restarts.isDue()) {
        core.restarts += 1;
        this.#restarts.restarted();
        core.cancel(0);
        continue;
      }
      let decision = 0;
      while (core.level < assumptions.length) {
        const assumption = assumptions[core.level]!;
        const value = core.values[assumption]!;
        if (value < 0) {
          this.#fail(assumption);
          return "unsatisfiable";
        }
        if (value === 0) {
          decision = assumption;
          break;
        }
        core.deepen();
      }
      if (decision === 0) {
        const variable = core.pick(core.heap);
        if (variable === 0) {
          this.#saveModel();
          return "satisfiable";
        }
        decision = variable * 2 + core.saved[variable]!;
        core.decisions += 1;
      }
      core.deepen();
      core.assign(decision, NONE);
    }
  }

  /** Learns from a conflict above the top level, goes back to where the learned clause asserts its first literal. */
  #learn(conflict: number): void {
    const core = this.#core;
    core.conflicts += 1;
    const level = analyse(core, conflict);
    core.noteDerived(core.clause, core.clauseSize);
    this.#restarts.learned(core.clauseLevels);
    core.cancel(level);
    const asserted = core.clause[0]!;
    const reason = core.clauseSize === 1 ? NONE : core.keep(core.clause, core.clauseSize, core.clauseLevels);
    core.assign(asserted, reason);
    core.fade();
  }

  /** Reduces the learned clauses when it is time; false when the search must end, for memory or by the meter. */
  #keepBounds(): boolean {
    const core = this.#core;
    if (core.conflicts >= this.#nextReduction || core.literals > core.mostLiterals) {
      this.#reductions += 1;
      this.#nextReduction = core.conflicts + FIRST_REDUCTION + REDUCTION_STEP * this.#reductions;
      reduce(core);
      if (core.literals > core.mostLiterals) {
        core.meter!.ended ??= "memory";
        core.stopped = true;
      }
    }
    return !core.stopped;
  }

  #saveModel(): void {
    const core = this.#core;
    this.#model = new Uint8Array(core.variables + 1);
    for (let variable = 1; variable <= core.variables; variable += 1)
      this.#model[variable] = core.values[variable * 2]! > 0 ? 1 : 0;
  }

  /** An assumption has come out false. */
  #fail(assumption: number): void {
    const core = this.#core;
    const packed = blame(core, assumption);
    this.#failed = packed.map(unpack);
    const negated = Int32Array.from(packed, (literal) => literal ^ 1);
    core.noteDerived(negated, negated.length);
  }
}
