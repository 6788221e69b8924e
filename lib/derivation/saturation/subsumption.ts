/**
 * Subsumption (Robinson 1965): a clause that has an instance within another one makes that one superfluous. Active
 * clauses of two or more literals stand in one list with a signature each, which rules out nearly all of them at sight.
 * Names (`splitting.ts`) are not looked at here.
 */
import { type ClauseStore, DELETED, HIDDEN } from "./clauses.ts";
import { NumberList } from "./lists.ts";
import { atomOf, isNegative } from "./ordering.ts";
import type { Substitution } from "./substitution.ts";
import { HEADER, IDENTITY, type TermBank } from "./terms.ts";
import type { WorkClock } from "./work-clock.ts";

/** Literal pairs that one test of subsumption may try; beyond, it counts as failed. */
const MOST_TRIES = 300;

/**
 * Sizes of a clause packed in fields, each below a guard bit: 5 bits of positive literals, 5 of negative ones, 9 of
 * weight, 5 of depth. A field that would overflow holds its greatest value.
 */
const GUARDS = (1 << 5) | (1 << 11) | (1 << 21) | (1 << 27);

export class SubsumptionIndex {
  readonly #bank: TermBank;
  readonly #store: ClauseStore;
  readonly #substitution: Substitution;
  readonly #clock: WorkClock;
  /** Records of clause, bits of heads and paths, bits of equal arguments and inner symbols, sizes. */
  readonly #list = new NumberList();
  #heads = 0;
  #inner = 0;
  #sizes = 0;
  #used = new Uint8Array(256);
  #tries = 0;

  constructor(bank: TermBank, store: ClauseStore, substitution: Substitution, clock: WorkClock) {
    this.#bank = bank;
    this.#store = store;
    this.#substitution = substitution;
    this.#clock = clock;
  }

  add(clause: number): void {
    this.#sign(clause);
    this.#list.push4(clause, this.#heads, this.#inner, this.#sizes);
    this.#list.retain4((other) => !this.#store.is(other, DELETED));
  }

  /** An active clause, not itself, that subsumes a clause; -1 if there is none. */
  findSubsuming(clause: number): number {
    this.#sign(clause);
    const { values, length } = this.#list;
    const notHeads = ~this.#heads;
    const notInner = ~this.#inner;
    const sizes = this.#sizes | GUARDS;
    for (let k = 0; k < length; k += 4) {
      if ((values[k + 1]! & notHeads) !== 0 || (values[k + 2]! & notInner) !== 0) continue;
      if (((sizes - values[k + 3]!) & GUARDS) !== GUARDS) continue;
      const other = values[k]!;
      if (other !== clause && !this.#store.is(other, HIDDEN) && this.subsumes(other, clause)) return other;
    }
    this.#clock.tick(length >> 4);
    return -1;
  }

  /** Calls back for each active clause of two or more literals, not itself, that a clause subsumes. */
  forSubsumed(clause: number, act: (subsumed: number) => void): void {
    this.#sign(clause);
    const { values, length } = this.#list;
    const heads = this.#heads;
    const inner = this.#inner;
    const sizes = this.#sizes;
    for (let k = 0; k < length; k += 4) {
      if ((heads & ~values[k + 1]!) !== 0 || (inner & ~values[k + 2]!) !== 0) continue;
      if ((((values[k + 3]! | GUARDS) - sizes) & GUARDS) !== GUARDS) continue;
      const other = values[k]!;
      if (other !== clause && !this.#store.is(other, HIDDEN) && this.subsumes(clause, other)) act(other);
    }
    this.#clock.tick(length >> 4);
  }

  /** Whether different literals of the second clause are an instance of the first, apart from names. */
  subsumes(general: number, special: number): boolean {
    const mark = this.#substitution.mark;
    this.#tries = 0;
    const length = this.#store.length(special);
    for (let k = 0; k < length; k += 1) this.#used[k] = 0;
    const result = this.#covers(general, 0, special);
    this.#substitution.undo(mark);
    this.#clock.tick(this.#tries);
    return result;
  }

  #covers(general: number, from: number, special: number): boolean {
    if (from === this.#store.length(general)) return true;
    const literal = this.#store.literal(general, from);
    const pattern = atomOf(literal);
    const { words } = this.#bank;
    // Names come last.
    if (this.#bank.isName[words[pattern]!]) return true;
    const length = this.#store.length(special);
    for (let k = 0; k < length; k += 1) {
      if (this.#used[k] !== 0) continue;
      const other = this.#store.literal(special, k);
      const atom = atomOf(other);
      if (((literal ^ other) & 1) !== 0 || words[pattern] !== words[atom]) continue;
      if (++this.#tries > MOST_TRIES) return false;
      const mark = this.#substitution.mark;
      this.#used[k] = 1;
      if (this.#substitution.match(pattern, atom) && this.#covers(general, from + 1, special)) return true;
      this.#substitution.undo(mark);
      if (words[pattern] === IDENTITY) {
        if (
          this.#substitution.match(words[pattern + HEADER]!, words[atom + HEADER + 1]!) &&
          this.#substitution.match(words[pattern + HEADER + 1]!, words[atom + HEADER]!) &&
          this.#covers(general, from + 1, special)
        )
          return true;
        this.#substitution.undo(mark);
      }
      this.#used[k] = 0;
    }
    return false;
  }

  #sign(clause: number): void {
    const { words, arities } = this.#bank;
    let heads = 0;
    let inner = 0;
    let positive = 0;
    let negative = 0;
    let weight = 0;
    let depth = 0;
    for (let k = 0; k < this.#store.length(clause); k += 1) {
      const literal = this.#store.literal(clause, k);
      const atom = atomOf(literal);
      if (this.#bank.isName[words[atom]!]) break;
      const head = words[atom]! * 2 + (literal & 1);
      const isEquation = words[atom] === IDENTITY;
      heads |= 1 << (head & 7);
      const arity = arities[words[atom]!]!;
      for (let i = 0; i < arity; i += 1) {
        const arg = words[atom + HEADER + i]!;
        if (arg > 0) {
          heads |= 1 << (8 + (((head * 5 + (isEquation ? 0 : i)) * 31 + words[arg]! * 7) % 24));
          inner |= this.#innerBits(arg);
        }
        for (let j = 0; j < i; j += 1)
          if (words[atom + HEADER + j] === arg) inner |= 1 << ((head * 3 + i * 2 + j) & 7);
      }
      if (isNegative(literal)) negative += 1;
      else positive += 1;
      weight += this.#bank.weight(atom);
      depth = Math.max(depth, this.#bank.depth(atom));
    }
    this.#heads = heads;
    this.#inner = inner;
    this.#sizes =
      Math.min(positive, 31) |
      (Math.min(negative, 31) << 6) |
      (Math.min(weight, 511) << 12) |
      (Math.min(depth, 31) << 22);
  }

  #innerBits(term: number): number {
    const { words } = this.#bank;
    const symbol = words[term]!;
    let bits = 1 << (8 + (symbol & 7));
    const arity = this.#bank.arities[symbol]!;
    for (let i = 0; i < arity; i += 1) {
      const arg = words[term + HEADER + i]!;
      if (arg > 0)
        bits |= (1 << (16 + ((symbol * 11 + i * 5 + words[arg]! * 3) & 15))) | this.#innerBits(arg);
    }
    return bits;
  }
}
