import { analyse } from "./analyse.ts";
import { type Core, NONE } from "./core.ts";
import { propagate } from "./propagate.ts";

/** `ended`: the meter's `ended` says why; `stopped`: by the receiver of the models. */
export type Enumeration = "complete" | "ended" | "stopped";

/** The level below all decisions of an enumeration. What is flipped here does not follow from the clauses alone. */
const BASE = 1;

/**
 * Finds all assignments to some variables that extend to a model, each once, without clauses that exclude those
 * found: chronological backtracking over the decisions on these variables, with clauses learned from conflicts above
 * the level to which it has gone back (Gebser, Kaufmann, Neumann & Schaub 2007; for some of the variables: Gebser,
 * Kaufmann & Schaub 2009).
 *
 * Levels up to `#bound` are settled: the other value of each decision there is still to come, and is tried by
 * flipping the decision, which then belongs to the level below and has no reason. Levels above are as in a search
 * for one model. The variables asked for are decided before all others.
 */
class EnumerationRun {
  readonly #core: Core;
  readonly #over: readonly number[];
  /** The highest settled level. */
  #bound = BASE;
  /** The level of the last decision on a variable that is asked for; lower levels are all of this kind. */
  #lastOver = BASE;
  /**
   * Literals that learned clauses asserted while their level was above what the clause needs, and the level it
   * needs: when the search goes back, they are asserted again. Of clauses of one literal, it is 0.
   */
  #asserted: { readonly literal: number; readonly level: number }[] = [];

  /** The variables that are not asked for. */
  readonly #others: readonly number[];
  /** How much oftener {@link #completeAtOnce} has succeeded than failed. */
  #luck = 8;

  constructor(core: Core, over: readonly number[]) {
    this.#core = core;
    this.#over = over;
    const others: number[] = [];
    for (let variable = 1; variable <= core.variables; variable += 1)
      if (core.first[variable] === 0 && core.values[variable * 2] === 0) others.push(variable);
    this.#others = others;
  }

  run(onModel: (values: Uint8Array) => boolean, learned: () => boolean): Enumeration {
    const core = this.#core;
    const over = this.#over;
    const values = new Uint8Array(over.length);
    const places = new Int32Array(core.variables + 1).fill(-1);
    over.forEach((variable, index) => {
      places[variable] = index;
    });
    for (;;) {
      const conflict = propagate(core);
      if (conflict !== NONE) {
        if (core.level > this.#bound) {
          this.#learn(conflict);
          if (!learned()) return "ended";
        } else if (!this.#flip(this.#bound)) return "complete";
        continue;
      }
      if (core.stopped) return "ended";
      const last = core.trailSize === core.variables - 1 ? this.#lastUnassigned() : 0;
      if (last === 0 && this.#decide()) continue;
      for (let index = 0; index < values.length; index += 1)
        values[index] = core.values[over[index]! * 2]! > 0 ? 1 : 0;
      if (!onModel(values)) return "stopped";
      if (last !== 0) {
        // After propagation no clause hangs on the last variable alone: both its values make all clauses true.
        values[places[last]!] = 1;
        core.visits += 1;
        if (!onModel(values)) return "stopped";
      }
      if (!this.#flip(this.#lastOver)) return "complete";
    }
  }

  /** The only unassigned variable, when it is one of those asked for; else 0. */
  #lastUnassigned(): number {
    const core = this.#core;
    const variable = core.pick(core.firstHeap);
    if (variable !== 0) core.firstHeap.insert(variable);
    return variable;
  }

  /** Literals that clauses of one literal asserted. */
  get units(): readonly number[] {
    return this.#asserted.filter((entry) => entry.level === 0).map((entry) => entry.literal);
  }

  /** False when all variables are assigned. */
  #decide(): boolean {
    const core = this.#core;
    let variable = core.pick(core.firstHeap);
    const isOver = variable !== 0;
    if (!isOver) {
      if (this.#luck > 0) {
        if (this.#completeAtOnce()) return false;
        if (core.stopped) return true;
      }
      variable = core.pick(core.heap);
    }
    if (variable === 0) return false;
    core.decisions += 1;
    core.deepen();
    if (isOver) this.#lastOver = core.level;
    core.assign(variable * 2 + core.saved[variable]!, NONE);
    return true;
  }

  /**
   * Tries to give all other variables the values they had last, on one level that is given up at the first conflict.
   * Mostly they still fit, and this is several times faster than a level and a place in the heap for each.
   */
  #completeAtOnce(): boolean {
    const core = this.#core;
    const level = core.level;
    core.deepen();
    for (const variable of this.#others) {
      if (core.values[variable * 2] !== 0) continue;
      core.decisions += 1;
      core.assign(variable * 2 + core.saved[variable]!, NONE);
      if (propagate(core) === NONE && !core.stopped) continue;
      if (!core.stopped) this.#luck -= 2;
      core.cancel(level);
      return false;
    }
    this.#luck += 1;
    return true;
  }

  #learn(conflict: number): void {
    const core = this.#core;
    core.conflicts += 1;
    const level = analyse(core, conflict);
    const { clause, clauseSize } = core;
    core.noteDerived(clause, clauseSize);
    const target = Math.max(level, this.#bound);
    core.cancel(target);
    this.#lastOver = Math.min(this.#lastOver, target);
    core.assign(clause[0]!, clauseSize === 1 ? NONE : core.keep(clause, clauseSize, core.clauseLevels));
    if (level < target) this.#asserted.push({ literal: clause[0]!, level });
    core.fade();
  }

  /** Goes on to the other value of the decision of a level; false when there is none. */
  #flip(level: number): boolean {
    if (level <= BASE) return false;
    const core = this.#core;
    const decision = core.trail[core.limits[level]!]!;
    const below = level - 1;
    this.#bound = below;
    this.#lastOver = below;
    if (this.#asserted.length === 0) {
      core.cancel(below);
      core.assign(decision ^ 1, NONE);
      return true;
    }
    const kept = this.#asserted.filter((entry) => entry.level <= below);
    const reasons = kept.map(({ literal }) => core.origins[literal | 1]!);
    core.cancel(below);
    this.#asserted = kept;
    kept.forEach(({ literal }, index) => {
      if (core.values[literal] === 0) core.assign(literal, reasons[index]!);
    });
    core.assign(decision ^ 1, NONE);
    return true;
  }
}

/**
 * Runs an enumeration from the top level and goes back there.
 * @param learned called after each learned clause; false ends the enumeration
 */
export function enumerateModels(
  core: Core,
  over: readonly number[],
  onModel: (values: Uint8Array) => boolean,
  learned: () => boolean,
): Enumeration {
  if (propagate(core) !== NONE) {
    core.contradict();
    return "complete";
  }
  if (core.stopped) return "ended";
  for (const variable of over) {
    core.first[variable] = 1;
    if (core.values[variable * 2] === 0) core.firstHeap.insert(variable);
  }
  core.deepen();
  const run = new EnumerationRun(core, over);
  const outcome = run.run(onModel, learned);
  core.cancel(0);
  core.firstHeap.clear();
  for (const variable of over) {
    core.first[variable] = 0;
    core.heap.insert(variable);
  }
  for (const literal of run.units) {
    if (core.values[literal] === 0) core.assign(literal, NONE);
    else if (core.values[literal]! < 0) core.contradict();
  }
  return outcome;
}
