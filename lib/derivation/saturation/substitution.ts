/** Unification (Robinson 1965) and matching over one array of bindings, and terms with the bindings put in. */
import { HEADER, indexOf, SHIFT, type TermBank, variable } from "./terms.ts";

/** Nodes that putting bindings into the terms of one clause may visit; more are given up. */
const LARGEST_INSTANCE = 4_000;

export class Substitution {
  readonly #bank: TermBank;
  /** By variable: the term that it is bound to, 0 when it is free. */
  readonly #bindings = new Int32Array(4 * SHIFT);
  /** The variables bound, in order. */
  readonly #trail = new Int32Array(4 * SHIFT);
  #bound = 0;
  /** By variable that stayed free: one more than its number in the instance; 0 when it has none yet. */
  readonly #renamed = new Int32Array(4 * SHIFT);
  readonly #named = new Int32Array(4 * SHIFT);
  /** How many variables the instance has. */
  instanceVariables = 0;
  #visited = 0;
  /** Arguments of the terms under construction. */
  #stack = new Int32Array(1 << 12);
  #top = 0;

  constructor(bank: TermBank) {
    this.#bank = bank;
  }

  /** How many bindings there are; {@link undo} goes back to such a mark. */
  get mark(): number {
    return this.#bound;
  }

  undo(mark: number): void {
    while (this.#bound > mark) {
      this.#bound -= 1;
      this.#bindings[this.#trail[this.#bound]!] = 0;
    }
  }

  #bind(v: number, term: number): void {
    this.#bindings[v] = term;
    this.#trail[this.#bound++] = v;
  }

  /** Extends the bindings to make two terms equal. When that fails, some bindings may be left to undo. */
  unify(left: number, right: number): boolean {
    const bindings = this.#bindings;
    let a = left;
    let b = right;
    while (a < 0 && bindings[-1 - a] !== 0) a = bindings[-1 - a]!;
    while (b < 0 && bindings[-1 - b] !== 0) b = bindings[-1 - b]!;
    if (a === b) return true;
    if (a < 0) {
      if (b > 0 && this.#reaches(a, b)) return false;
      this.#bind(indexOf(a), b);
      return true;
    }
    if (b < 0) {
      if (this.#reaches(b, a)) return false;
      this.#bind(indexOf(b), a);
      return true;
    }
    const { words } = this.#bank;
    if (words[a] !== words[b]) return false;
    if (this.#bank.isGround(a) && this.#bank.isGround(b)) return false;
    const arity = this.#bank.arities[words[a]!]!;
    for (let k = 0; k < arity; k += 1)
      if (!this.unify(words[a + HEADER + k]!, words[b + HEADER + k]!)) return false;
    return true;
  }

  /** Whether a free variable occurs in a term with the bindings put in. */
  #reaches(free: number, term: number): boolean {
    if (term < 0) {
      const bound = this.#bindings[-1 - term]!;
      return bound === 0 ? term === free : this.#reaches(free, bound);
    }
    if (this.#bank.isGround(term)) return false;
    const { words } = this.#bank;
    const end = term + HEADER + this.#bank.arities[words[term]!]!;
    for (let k = term + HEADER; k < end; k += 1) if (this.#reaches(free, words[k]!)) return true;
    return false;
  }

  /** Extends the bindings of the pattern's variables to make it the term, whose variables are as constants. */
  match(pattern: number, term: number): boolean {
    if (pattern < 0) {
      const v = -1 - pattern;
      const bound = this.#bindings[v]!;
      if (bound !== 0) return bound === term;
      this.#bind(v, term);
      return true;
    }
    if (term < 0) return false;
    const { words } = this.#bank;
    if (words[pattern] !== words[term]) return false;
    if (this.#bank.isGround(pattern)) return pattern === term;
    if (words[pattern + 1]! > words[term + 1]!) return false;
    const arity = this.#bank.arities[words[pattern]!]!;
    for (let k = 0; k < arity; k += 1)
      if (!this.match(words[pattern + HEADER + k]!, words[term + HEADER + k]!)) return false;
    return true;
  }

  /** Begins a new instance: free variables will be numbered from 0 in the order in which they are met. */
  beginInstance(): void {
    const renamed = this.#renamed;
    for (let k = 0; k < this.instanceVariables; k += 1) renamed[this.#named[k]!] = 0;
    this.instanceVariables = 0;
    this.#visited = 0;
  }

  /** A term with the bindings put in and free variables renumbered; 0 when it is too large. */
  instance(term: number): number {
    this.#top = 0;
    return this.#instance(term);
  }

  /** As {@link instance} with another term in place of the subterm at a place, counted in reading order from 0. */
  instanceWith(term: number, place: number, replacement: number): number {
    this.#top = 0;
    this.#place = place;
    return this.#instanceWith(term, replacement);
  }
  #place = 0;

  #instanceWith(term: number, replacement: number): number {
    if (this.#place === 0) {
      this.#place = -1;
      return this.#instance(replacement);
    }
    this.#place -= 1;
    if (term < 0) return this.#instance(term);
    const base = this.#reserve(term);
    const { arities } = this.#bank;
    const symbol = this.#bank.words[term]!;
    for (let k = 0; k < arities[symbol]!; k += 1) {
      const arg = this.#bank.words[term + HEADER + k]!;
      const made = this.#place < 0 ? this.#instance(arg) : this.#instanceWith(arg, replacement);
      if (made === 0) return 0;
      this.#stack[base + k] = made;
    }
    this.#top = base;
    return this.#bank.make(symbol, this.#stack, base);
  }

  #instance(term: number): number {
    if (term < 0) {
      const v = -1 - term;
      const bound = this.#bindings[v]!;
      if (bound !== 0) return this.#instance(bound);
      if (this.#renamed[v] === 0) {
        this.#named[this.instanceVariables++] = v;
        this.#renamed[v] = this.instanceVariables;
      }
      return -this.#renamed[v]!;
    }
    if (this.#bank.isGround(term)) return term;
    this.#visited += 1;
    if (this.#visited > LARGEST_INSTANCE) return 0;
    const base = this.#reserve(term);
    const symbol = this.#bank.words[term]!;
    const arity = this.#bank.arities[symbol]!;
    for (let k = 0; k < arity; k += 1) {
      const made = this.#instance(this.#bank.words[term + HEADER + k]!);
      if (made === 0) return 0;
      this.#stack[base + k] = made;
    }
    this.#top = base;
    return this.#bank.make(symbol, this.#stack, base);
  }

  /** Room for the arguments of a term on the stack. */
  #reserve(term: number): number {
    const base = this.#top;
    this.#top = base + this.#bank.arities[this.#bank.words[term]!]!;
    if (this.#top > this.#stack.length) {
      const longer = new Int32Array(this.#stack.length * 2);
      longer.set(this.#stack);
      this.#stack = longer;
    }
    return base;
  }

  /** A pattern with what its variables were matched to; the terms bound are taken as they are. */
  image(pattern: number): number {
    this.#top = 0;
    return this.#image(pattern);
  }

  #image(term: number): number {
    if (term < 0) {
      const bound = this.#bindings[-1 - term]!;
      return bound === 0 ? term : bound;
    }
    if (this.#bank.isGround(term)) return term;
    const base = this.#reserve(term);
    const symbol = this.#bank.words[term]!;
    const arity = this.#bank.arities[symbol]!;
    for (let k = 0; k < arity; k += 1)
      this.#stack[base + k] = this.#image(this.#bank.words[term + HEADER + k]!);
    this.#top = base;
    return this.#bank.make(symbol, this.#stack, base);
  }
}

/** A term with {@link SHIFT} added to its variables. */
export function shifted(bank: TermBank, term: number): number {
  if (term < 0) return variable(indexOf(term) + SHIFT);
  if (bank.isGround(term)) return term;
  const symbol = bank.words[term]!;
  const args = new Int32Array(bank.arities[symbol]!);
  for (let k = 0; k < args.length; k += 1) args[k] = shifted(bank, bank.words[term + HEADER + k]!);
  return bank.make(symbol, args, 0);
}
