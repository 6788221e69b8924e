import type { Meter } from "../../logic/meter.ts";
import { ACTIVITY_WORD, ClauseArena, HEADER } from "./arena.ts";
import { VariableHeap } from "./heap.ts";
import { grownInt32, unpack } from "./literals.ts";
import { WatchLists } from "./watches.ts";

/** No clause: the reason of a decision, or no conflict. */
export const NONE = -1;

/**
 * A reason or conflict is a clause's offset in the arena (≥ 0), {@link NONE}, or a clause of two literals, which is
 * not in the arena: then it is `−2 − l`, where l is the packed literal that is false. A conflict of this kind leaves
 * its other literal in {@link Core.conflictLiteral}.
 */
export function twoLiteralReason(literal: number): number {
  return -2 - literal;
}

/** The false literal of a reason made by {@link twoLiteralReason}. */
export function literalOfReason(reason: number): number {
  return -2 - reason;
}

/** Is told of clauses as they come and go, in signed literals, so that a proof can be written down. */
export interface ProofObserver {
  /** A clause that follows by unit propagation from those there are (Goldberg & Novikov 2003). */
  onDerived?(clause: readonly number[]): void;
  /** A clause that is not used any more. */
  onDeleted?(clause: readonly number[]): void;
}

/** By how much activities fade at a conflict. On encodings of models 0.9 is better than the usual 0.95. */
const DECAY = 0.9;
const CLAUSE_DECAY = 0.999;
/** Activities are scaled down when one exceeds this. */
const MOST_ACTIVITY = 1e100;
const MOST_CLAUSE_ACTIVITY = 1e20;

/**
 * What the parts of the solver share: the clauses, the assignment, and the order of decisions. `propagate`,
 * `analyse`, `reduce` and the searches are functions on it in files of their own.
 */
export class Core {
  // Clauses

  /** The clauses of three literals or more. */
  readonly arena = new ClauseArena();
  /** Offsets of the given clauses in the arena. */
  given: number[] = [];
  /** Offsets of the learned clauses in the arena. */
  learned: number[] = [];
  /** Which clauses are to be looked at when a literal becomes true. */
  readonly watches = new WatchLists();
  /** How many literals were true at the top level when clauses that they make true were last looked for. */
  settled = 0;
  /** False once the clauses are contradictory by themselves. */
  consistent = true;

  // Assignment

  /** The number of variables; they are 1, 2, …, this. */
  variables = 0;
  /** By literal: 1 true, −1 false, 0 unassigned. */
  values: Int8Array = new Int8Array(16);
  /**
   * For variable v, at 2v the decision level at which it was assigned, at 2v + 1 the reason, see
   * {@link twoLiteralReason}; so, for a literal, at `literal & −2` and at `literal | 1`. Meaningless while it is
   * unassigned.
   */
  origins: Int32Array = new Int32Array(16);
  /** The assigned literals, the oldest first. */
  trail: Int32Array = new Int32Array(8);
  trailSize = 0;
  /** The next entry of the trail to propagate. */
  head = 0;
  /** The decision level: 0 is the top, where everything follows from the clauses alone. */
  level = 0;
  /** By level, from 1: the length of the trail when the level was begun. */
  limits: Int32Array = new Int32Array(16);
  /** The other literal of a conflict between two, see {@link twoLiteralReason}. */
  conflictLiteral = 0;

  // Order of decisions

  /** By variable: its part in recent conflicts. */
  activity: Float64Array = new Float64Array(8);
  /** What a conflict adds to an activity; grows instead of letting the activities shrink (Eén & Sörensson 2003). */
  increment = 1;
  /** Unassigned variables, and some assigned ones, that are decided by activity. */
  readonly heap = new VariableHeap(this.activity);
  /** As {@link heap}, for the variables that an enumeration decides before all others. */
  readonly firstHeap = new VariableHeap(this.activity);
  /** By variable: 1 if it belongs to {@link firstHeap}. */
  first: Uint8Array = new Uint8Array(8);
  /** By variable: 1 if it is to be decided false, 0 if true; its last value (Pipatsrisawat & Darwiche 2007). */
  saved: Uint8Array = new Uint8Array(8);
  /** What a conflict adds to the activity of a learned clause. */
  clauseIncrement = 1;

  // Work of the analysis; see analyse.ts

  /** By variable: 0, or a mark of the analysis. All 0 between analyses. */
  seen: Uint8Array = new Uint8Array(8);
  /** The clause learned last. The literal that it asserts comes first, then one of the highest level among the others. */
  clause: Int32Array = new Int32Array(8);
  clauseSize = 0;
  /** How many decision levels the clause learned last spans. */
  clauseLevels = 0;
  /** Variables whose mark is to be cleared. */
  marked: Int32Array = new Int32Array(8);
  /** Literals that the minimisation has yet to look at. */
  stack: Int32Array = new Int32Array(8);
  /** By level: the number of the last analysis that met it, in {@link stamp}s. */
  stamps: Int32Array = new Int32Array(16);
  stamp = 0;

  // Work done

  conflicts = 0;
  decisions = 0;
  propagations = 0;
  restarts = 0;
  /** Assignments and watched clauses looked at. A thousand are a step. */
  visits = 0;
  /** Visits that the meter has been told of. */
  reported = 0;
  /** Null outside a search. */
  meter: Meter | null = null;
  /** Whether the meter has ended the search. */
  stopped = false;
  /** Literals in all clauses that are kept. */
  literals = 0;
  /** The bound on {@link literals}. */
  readonly mostLiterals: number;
  /** Whether a clause could not be kept for want of room. The clauses are then not all there. */
  overfull = false;
  readonly observer: ProofObserver | null;

  constructor(mostLiterals: number, observer: ProofObserver | null) {
    this.mostLiterals = mostLiterals;
    this.observer = observer;
  }

  newVariable(): number {
    this.variables += 1;
    const variable = this.variables;
    if (variable >= this.trail.length) this.reserve(variable * 2);
    this.saved[variable] = 1;
    this.heap.insert(variable);
    return variable;
  }

  /** Makes room for variables below `variables`. */
  reserve(variables: number): void {
    if (variables <= this.trail.length) return;
    const values = new Int8Array(variables * 2);
    values.set(this.values);
    this.values = values;
    this.origins = grownInt32(this.origins, variables * 2);
    this.trail = grownInt32(this.trail, variables);
    this.clause = grownInt32(this.clause, variables);
    this.marked = grownInt32(this.marked, variables);
    this.stack = grownInt32(this.stack, variables * 2);
    const activity = new Float64Array(variables);
    activity.set(this.activity);
    this.activity = activity;
    this.first = grownBytes(this.first, variables);
    this.saved = grownBytes(this.saved, variables);
    this.seen = grownBytes(this.seen, variables);
    for (const heap of [this.heap, this.firstHeap]) {
      heap.activity = activity;
      heap.reserve(variables);
    }
    this.watches.reserve(variables * 2);
  }

  /** Makes room for as many decision levels; assumptions may need more of them than there are variables. */
  reserveLevels(levels: number): void {
    if (levels < this.limits.length) return;
    this.limits = grownInt32(this.limits, levels * 2);
    this.stamps = grownInt32(this.stamps, levels * 2);
  }

  // Clauses

  /** Keeps a clause of two or more packed literals, the first two watched; returns it as a reason for the first. */
  keep(literals: Int32Array, length: number, levels: number): number {
    this.literals += length;
    const first = literals[0]!;
    const second = literals[1]!;
    if (length === 2) {
      this.watches.implies(first ^ 1, second);
      this.watches.implies(second ^ 1, first);
      return twoLiteralReason(second);
    }
    const clause = this.arena.add(literals, length, levels);
    (levels === 0 ? this.given : this.learned).push(clause);
    this.watches.watch(first ^ 1, clause, second);
    this.watches.watch(second ^ 1, clause, first);
    return clause;
  }

  /** Marks a clause of the arena as deleted; the watches still name it. */
  discard(clause: number): void {
    const length = this.arena.words[clause]!;
    this.literals -= length;
    this.observer?.onDeleted?.(this.#signed(this.arena.words, clause + HEADER, length));
    this.arena.delete(clause);
  }

  /** Tells the observer of a clause that was derived. */
  noteDerived(literals: Int32Array, length: number): void {
    this.observer?.onDerived?.(this.#signed(literals, 0, length));
  }

  #signed(literals: Int32Array, from: number, length: number): number[] {
    return Array.from(literals.subarray(from, from + length), unpack);
  }

  /** The clauses have turned out to be contradictory. */
  contradict(): void {
    if (this.consistent) this.noteDerived(this.clause, 0);
    this.consistent = false;
  }

  // Assignment

  /** Makes an unassigned literal true at the current level. */
  assign(literal: number, reason: number): void {
    this.values[literal] = 1;
    this.values[literal ^ 1] = -1;
    this.origins[literal & -2] = this.level;
    this.origins[literal | 1] = reason;
    this.trail[this.trailSize] = literal;
    this.trailSize += 1;
  }

  /** Begins a decision level. */
  deepen(): void {
    this.level += 1;
    this.limits[this.level] = this.trailSize;
  }

  /** Takes back all levels above `level`. */
  cancel(level: number): void {
    if (this.level <= level) return;
    const { trail, values, saved, first, heap, firstHeap } = this;
    const end = this.limits[level + 1]!;
    for (let index = this.trailSize - 1; index >= end; index -= 1) {
      const literal = trail[index]!;
      const variable = literal >> 1;
      values[literal] = 0;
      values[literal ^ 1] = 0;
      saved[variable] = literal & 1;
      if (first[variable] === 0) heap.insert(variable);
      else firstHeap.insert(variable);
    }
    this.trailSize = end;
    if (this.head > end) this.head = end;
    this.level = level;
  }

  /** The most active unassigned variable of a heap; 0 when there is none. */
  pick(heap: VariableHeap): number {
    const { values } = this;
    while (heap.size > 0) {
      const variable = heap.pop();
      if (values[variable * 2] === 0) return variable;
    }
    return 0;
  }

  // Activity

  bump(variable: number): void {
    const grown = this.activity[variable]! + this.increment;
    this.activity[variable] = grown;
    if (grown > MOST_ACTIVITY) {
      for (let other = 1; other <= this.variables; other += 1) this.activity[other]! /= MOST_ACTIVITY;
      this.increment /= MOST_ACTIVITY;
    }
    if (this.first[variable] === 0) this.heap.raised(variable);
    else this.firstHeap.raised(variable);
  }

  bumpClause(clause: number): void {
    const { floats } = this.arena;
    const grown = floats[clause + ACTIVITY_WORD]! + this.clauseIncrement;
    floats[clause + ACTIVITY_WORD] = grown;
    if (grown > MOST_CLAUSE_ACTIVITY) {
      for (const other of this.learned) floats[other + ACTIVITY_WORD]! /= MOST_CLAUSE_ACTIVITY;
      this.clauseIncrement /= MOST_CLAUSE_ACTIVITY;
    }
  }

  /** Lets all activities fade, by letting what is added to them grow. */
  fade(): void {
    this.increment /= DECAY;
    this.clauseIncrement /= CLAUSE_DECAY;
  }

  // Work done

  /** Tells the meter of the visits since the last time; false when the search must stop. */
  report(): boolean {
    if (this.meter === null) return true;
    const visits = this.visits - this.reported;
    this.reported = this.visits;
    if (!this.meter.spend(visits)) this.stopped = true;
    return !this.stopped;
  }
}

function grownBytes(old: Uint8Array, capacity: number): Uint8Array {
  const grown = new Uint8Array(capacity);
  grown.set(old);
  return grown;
}
