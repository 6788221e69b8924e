import { grownInt32 } from "./literals.ts";

/**
 * A growing list of records for every literal, all in one array. A list that is full moves to the end with twice
 * the room; the array is packed anew when it is full and half of it is abandoned.
 */
export class WatchLists {
  /** Int32 words in a record. */
  readonly width: number;
  /** All lists. Readers must fetch it again after an {@link push}, which may put a new one here. */
  pool: Int32Array = new Int32Array(1 << 12);
  /** By literal: where its list begins in the pool. */
  start: Int32Array = new Int32Array(16);
  /** By literal: how many words of its list are in use. */
  size: Int32Array = new Int32Array(16);
  /** By literal: how many words are set aside for its list. */
  room: Int32Array = new Int32Array(16);
  /** Words of the pool that are set aside or abandoned. */
  #used = 0;
  /** Words of the pool that are set aside for some list. */
  #live = 0;

  constructor(width: number) {
    this.width = width;
  }

  /** Makes room for literals below `literals`. */
  reserve(literals: number): void {
    this.start = grownInt32(this.start, literals);
    this.size = grownInt32(this.size, literals);
    this.room = grownInt32(this.room, literals);
  }

  /** Adds a record of one word, or of two. */
  push(literal: number, first: number, second: number): void {
    const at = this.size[literal]!;
    if (at + this.width > this.room[literal]!) this.#enlarge(literal);
    const place = this.start[literal]! + at;
    this.pool[place] = first;
    if (this.width === 2) this.pool[place + 1] = second;
    this.size[literal] = at + this.width;
  }

  #enlarge(literal: number): void {
    const before = this.room[literal]!;
    const room = before === 0 ? 4 * this.width : before * 2;
    if (this.#used + room > this.pool.length) this.#repack(room);
    const from = this.start[literal]!;
    this.pool.copyWithin(this.#used, from, from + this.size[literal]!);
    this.start[literal] = this.#used;
    this.room[literal] = room;
    this.#used += room;
    this.#live += room - before;
  }

  /** Packs all lists, in the order of literals, into a pool that has `extra` words to spare. */
  #repack(extra: number): void {
    const needed = this.#live + extra;
    const capacity = needed * 2 > this.pool.length ? this.pool.length * 2 + extra : this.pool.length;
    const fresh = new Int32Array(capacity);
    let to = 0;
    for (let literal = 0; literal < this.start.length; literal += 1) {
      const from = this.start[literal]!;
      fresh.set(this.pool.subarray(from, from + this.size[literal]!), to);
      this.start[literal] = to;
      to += this.room[literal]!;
    }
    this.pool = fresh;
    this.#used = to;
  }
}
