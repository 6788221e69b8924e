/**
 * All clauses of one run, one after another in one array of words, so that a million of them cost no objects. A clause
 * never changes: what simplifies it makes another one and marks it as deleted. So each clause rests on earlier ones.
 */
import { grown } from "./terms.ts";

/**
 * Words before the literals: how many literals; how many variables, as 0, 1, …; state, of the bits below; the key by
 * which it waits. After the literals comes the record of how it came about (`draft.ts`), up to the next clause.
 */
const HEADER = 4;
const VARIABLES = 1;
const STATE = 2;
const KEY = 3;

/** Bits of the state. */
export const DELETED = 1;
export const ACTIVE = 2;
export const GOAL = 4;
/** Some name in the clause is true in the present model of the names: the clause is as well. */
export const FROZEN = 8;
/** Superfluous in the present model of the names. */
export const PARKED = 16;
/** Clauses with one of these bits take part in nothing. */
export const HIDDEN = DELETED | FROZEN | PARKED;

export class ClauseStore {
  #words: Int32Array = new Int32Array(1 << 12);
  #used = 0;
  /** By clause: where it begins in the words. */
  #starts: Int32Array = new Int32Array(1 << 10);
  count = 0;
  /** Literals of all clauses. */
  literals = 0;
  /** Duplicates: open addressing; holds one more than a clause, 0 is free. */
  #table = new Int32Array(1 << 9);

  /** Adds a clause; its number is how many there were before. */
  add(
    literals: Int32Array,
    length: number,
    variables: number,
    state: number,
    key: number,
    record: Int32Array,
    recordLength: number,
  ): number {
    const clause = this.count;
    const start = this.#used;
    const end = start + HEADER + length + recordLength;
    if (end > this.#words.length) this.#words = grown(this.#words, end);
    if (clause + 1 >= this.#starts.length) this.#starts = grown(this.#starts, clause + 2);
    const words = this.#words;
    words[start] = length;
    words[start + VARIABLES] = variables;
    words[start + STATE] = state;
    words[start + KEY] = key;
    for (let k = 0; k < length; k += 1) words[start + HEADER + k] = literals[k]!;
    for (let k = 0; k < recordLength; k += 1) words[start + HEADER + length + k] = record[k]!;
    this.#starts[clause] = start;
    this.#starts[clause + 1] = end;
    this.#used = end;
    this.count += 1;
    this.literals += length;
    this.#enter(clause);
    return clause;
  }

  length(clause: number): number {
    return this.#words[this.#starts[clause]!]!;
  }
  literal(clause: number, index: number): number {
    return this.#words[this.#starts[clause]! + HEADER + index]!;
  }
  variables(clause: number): number {
    return this.#words[this.#starts[clause]! + VARIABLES]!;
  }
  key(clause: number): number {
    return this.#words[this.#starts[clause]! + KEY]!;
  }
  is(clause: number, bit: number): boolean {
    return (this.#words[this.#starts[clause]! + STATE]! & bit) !== 0;
  }
  mark(clause: number, bit: number): void {
    this.#words[this.#starts[clause]! + STATE]! |= bit;
  }

  unmark(clause: number, bit: number): void {
    this.#words[this.#starts[clause]! + STATE]! &= ~bit;
  }

  /** How the clause came about. */
  record(clause: number): Int32Array {
    const start = this.#starts[clause]!;
    return this.#words.subarray(start + HEADER + this.#words[start]!, this.#starts[clause + 1]!);
  }

  /** Whether there is, or was, a clause of just these literals in this order. */
  has(literals: Int32Array, length: number): boolean {
    const mask = this.#table.length - 1;
    let slot = hashOf(literals, 0, length) & mask;
    for (let entry = this.#table[slot]!; entry !== 0; entry = this.#table[slot]!) {
      if (this.#isSame(entry - 1, literals, length)) return true;
      slot = (slot + 1) & mask;
    }
    return false;
  }

  #isSame(clause: number, literals: Int32Array, length: number): boolean {
    const start = this.#starts[clause]!;
    if (this.#words[start] !== length) return false;
    for (let k = 0; k < length; k += 1) if (this.#words[start + HEADER + k] !== literals[k]) return false;
    return true;
  }

  #enter(clause: number): void {
    if (this.count * 2 > this.#table.length) {
      this.#table = new Int32Array(this.#table.length * 2);
      for (let other = 0; other < clause; other += 1) this.#place(other);
    }
    this.#place(clause);
  }

  #place(clause: number): void {
    const start = this.#starts[clause]!;
    const mask = this.#table.length - 1;
    let slot = hashOf(this.#words, start + HEADER, this.#words[start]!) & mask;
    while (this.#table[slot] !== 0) slot = (slot + 1) & mask;
    this.#table[slot] = clause + 1;
  }
}

function hashOf(literals: Int32Array, from: number, length: number): number {
  let hash = length;
  for (let k = from; k < from + length; k += 1) {
    hash = Math.imul(hash ^ literals[k]!, 0x9e3779b1);
    hash ^= hash >>> 15;
  }
  return hash;
}
