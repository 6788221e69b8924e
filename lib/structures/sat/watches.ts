import { grownInt32 } from "./literals.ts";

/**
 * Words of {@link WatchLists.heads} for each literal. For either list of a literal, in turn: where it begins in the
 * pool, how many words of it are in use, how many are set aside; the fourth word is not used. All are in one place
 * because a literal that is propagated needs them together.
 */
export const HEAD = 8;
export const SIZE_WORD = 1;
export const ROOM_WORD = 2;
/** Where the head of the second list of a literal begins among its words. */
export const WATCHES = 4;

/**
 * Two growing lists for every literal p, all in one array:
 * first, what p implies in clauses of two literals: for (¬p ∨ q) the literal q;
 * second, the clauses of the arena that watch ¬p, as pairs: the clause, and some literal of it, the blocker; while
 * that is true the clause need not be looked at (Sörensson & Eén 2008).
 *
 * A list that is full moves to the end with twice the room; the array is packed anew when it is full.
 */
export class WatchLists {
  /** The lists. Readers must fetch it again after {@link implies} or {@link watch}, which may put a new one here. */
  pool: Int32Array = new Int32Array(1 << 12);
  /** Layout at {@link HEAD}; the words of literal p begin at `p·HEAD`. */
  heads: Int32Array = new Int32Array(16 * HEAD);
  /** Words of the pool that are set aside or abandoned. */
  #used = 0;
  /** Words of the pool that are set aside for some list. */
  #live = 0;

  /** Makes room for literals below `literals`. */
  reserve(literals: number): void {
    this.heads = grownInt32(this.heads, literals * HEAD);
  }

  /** Notes that `literal` implies `other`. */
  implies(literal: number, other: number): void {
    const head = literal * HEAD;
    const size = this.heads[head + SIZE_WORD]!;
    if (size === this.heads[head + ROOM_WORD]!) this.#enlarge(head);
    this.pool[this.heads[head]! + size] = other;
    this.heads[head + SIZE_WORD] = size + 1;
  }

  /** Notes that a clause is to be looked at when `literal` becomes true, unless `blocker` is true. */
  watch(literal: number, clause: number, blocker: number): void {
    const head = literal * HEAD + WATCHES;
    const size = this.heads[head + SIZE_WORD]!;
    if (size === this.heads[head + ROOM_WORD]!) this.#enlarge(head);
    const place = this.heads[head]! + size;
    this.pool[place] = clause;
    this.pool[place + 1] = blocker;
    this.heads[head + SIZE_WORD] = size + 2;
  }

  /** Doubles the room of a list. */
  #enlarge(head: number): void {
    const { heads } = this;
    const before = heads[head + ROOM_WORD]!;
    const room = before === 0 ? 4 : before * 2;
    if (this.#used + room > this.pool.length) this.#repack(room);
    const { pool } = this;
    const from = heads[head]!;
    const size = heads[head + SIZE_WORD]!;
    for (let word = 0; word < size; word += 1) pool[this.#used + word] = pool[from + word]!;
    heads[head] = this.#used;
    heads[head + ROOM_WORD] = room;
    this.#used += room;
    this.#live += room - before;
  }

  /** Packs all lists, in the order of literals, into a pool that has `extra` words to spare. */
  #repack(extra: number): void {
    const { heads, pool } = this;
    const needed = this.#live + extra;
    const fresh = new Int32Array(Math.max(pool.length, needed * 3));
    let to = 0;
    for (let head = 0; head < heads.length; head += WATCHES) {
      const room = heads[head + ROOM_WORD]!;
      if (room === 0) continue;
      const from = heads[head]!;
      const size = heads[head + SIZE_WORD]!;
      for (let word = 0; word < size; word += 1) fresh[to + word] = pool[from + word]!;
      heads[head] = to;
      to += room;
    }
    this.pool = fresh;
    this.#used = to;
  }
}
