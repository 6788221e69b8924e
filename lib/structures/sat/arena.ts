import { grownInt32 } from "./literals.ts";

/**
 * Words before the literals of a clause in {@link ClauseArena.words}:
 * word 0: how many literals; word 1: 0 for a given clause, else the number of decision levels in it when it was
 * last looked at (Audemard & Simon 2009), at least 1; word 2: the activity, a 32-bit float, see
 * {@link ClauseArena.floats}. Afterwards come the packed literals; the two that are watched are the first two.
 */
export const HEADER = 3;
export const LEVELS_WORD = 1;
export const ACTIVITY_WORD = 2;

/** In place of the number of literals: the clause has been deleted. Its length is then in the activity word. */
export const DELETED = -1;

/** All clauses of three or more literals, one after another in one array. A clause is named by its offset. */
export class ClauseArena {
  /** The clauses; layout at {@link HEADER}. */
  words: Int32Array = new Int32Array(1 << 12);
  /** The same memory read as floats, for the activities. */
  floats: Float32Array = new Float32Array(this.words.buffer);
  /** Words in use; the next clause is put here. */
  used = 0;
  /** The array from before the last {@link Compaction}, kept to be used again. */
  spare: Int32Array = new Int32Array(0);

  /** Adds a clause of `length` packed literals taken from the front of `literals`, and names it. */
  add(literals: Int32Array, length: number, levels: number): number {
    const clause = this.used;
    const end = clause + HEADER + length;
    if (end > this.words.length) {
      this.words = grownInt32(this.words, Math.max(end, this.words.length * 2));
      this.floats = new Float32Array(this.words.buffer);
    }
    const { words } = this;
    words[clause] = length;
    words[clause + LEVELS_WORD] = levels;
    words[clause + ACTIVITY_WORD] = 0;
    for (let index = 0; index < length; index += 1) words[clause + HEADER + index] = literals[index]!;
    this.used = end;
    return clause;
  }

  /** Marks a clause as deleted; {@link Compaction} takes it out. */
  delete(clause: number): void {
    this.words[clause + ACTIVITY_WORD] = this.words[clause]!;
    this.words[clause] = DELETED;
  }
}

/**
 * One garbage collection of an arena: live clauses move to another array in their old order; the old array keeps for
 * each its new offset, until the next compaction.
 */
export class Compaction {
  readonly #old: Int32Array;

  constructor(arena: ClauseArena) {
    const old = arena.words;
    const fresh = arena.spare.length === old.length ? arena.spare : new Int32Array(old.length);
    let to = 0;
    for (let from = 0; from < arena.used; ) {
      const length = old[from]!;
      if (length === DELETED) {
        from += HEADER + old[from + ACTIVITY_WORD]!;
        continue;
      }
      const size = HEADER + length;
      for (let word = 0; word < size; word += 1) fresh[to + word] = old[from + word]!;
      old[from + LEVELS_WORD] = to;
      from += size;
      to += size;
    }
    this.#old = old;
    arena.spare = old;
    arena.words = fresh;
    arena.floats = new Float32Array(fresh.buffer);
    arena.used = to;
  }

  /** Where a clause is now; {@link DELETED} when it has been deleted. */
  moved(clause: number): number {
    return this.#old[clause] === DELETED ? DELETED : this.#old[clause + LEVELS_WORD]!;
  }
}
