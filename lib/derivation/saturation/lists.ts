/** Growing lists of records of whole numbers, and the queue of clauses that wait. */
import type { ClauseStore } from "./clauses.ts";
import { grown } from "./terms.ts";

/** A list of numbers; its user says how many make a record. */
export class NumberList {
  values: Int32Array = new Int32Array(16);
  length = 0;
  #nextRetain = 2048;

  push4(a: number, b: number, c: number, d: number): void {
    if (this.length + 4 > this.values.length) this.values = grown(this.values, this.length + 4);
    this.values[this.length] = a;
    this.values[this.length + 1] = b;
    this.values[this.length + 2] = c;
    this.values[this.length + 3] = d;
    this.length += 4;
  }

  /**
   * Drops the records of four whose first number fails a test, keeping the order; does nothing unless the list has
   * doubled since it was done last.
   */
  retain4(isKept: (first: number) => boolean): void {
    if (this.length < this.#nextRetain) return;
    let length = 0;
    for (let from = 0; from < this.length; from += 4) {
      if (!isKept(this.values[from]!)) continue;
      this.values.copyWithin(length, from, from + 4);
      length += 4;
    }
    this.length = length;
    this.#nextRetain = Math.max(2048, 2 * length);
  }
}

/** Clauses by key, the least first; of equal keys the older one. A binary heap. */
export class ClauseHeap {
  readonly #store: ClauseStore;
  #heap: Int32Array = new Int32Array(256);
  #size = 0;

  constructor(store: ClauseStore) {
    this.#store = store;
  }

  push(clause: number): void {
    if (this.#size === this.#heap.length) this.#heap = grown(this.#heap, this.#size + 1);
    let place = this.#size++;
    while (place > 0) {
      const above = (place - 1) >> 1;
      if (!this.#isBefore(clause, this.#heap[above]!)) break;
      this.#heap[place] = this.#heap[above]!;
      place = above;
    }
    this.#heap[place] = clause;
  }

  /** The least clause, taken out; -1 when there is none. */
  pop(): number {
    if (this.#size === 0) return -1;
    const top = this.#heap[0]!;
    const last = this.#heap[--this.#size]!;
    let place = 0;
    for (;;) {
      let below = 2 * place + 1;
      if (below >= this.#size) break;
      if (below + 1 < this.#size && this.#isBefore(this.#heap[below + 1]!, this.#heap[below]!)) below += 1;
      if (!this.#isBefore(this.#heap[below]!, last)) break;
      this.#heap[place] = this.#heap[below]!;
      place = below;
    }
    this.#heap[place] = last;
    return top;
  }

  #isBefore(left: number, right: number): boolean {
    const more = this.#store.key(left) - this.#store.key(right);
    return more < 0 || (more === 0 && left < right);
  }
}
