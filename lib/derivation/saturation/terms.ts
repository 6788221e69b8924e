/**
 * Terms and atoms of one run, each stored once. A term is named by a number: a variable by a negative one, everything
 * else by its place in one array of words; equal terms have equal numbers. An atom is a term whose head is a relation.
 */

/** The relation of identity is symbol 0 of every bank. */
export const IDENTITY = 0;

/** Variables of a clause are 0, 1, …; a copy of a clause with variables of its own begins here. */
export const SHIFT = 256;

/** The term that variable v is. */
export function variable(v: number): number {
  return -1 - v;
}
/** The variable that a negative term is. */
export function indexOf(term: number): number {
  return -1 - term;
}

/** Words before the arguments of a term: symbol, weight (how many symbols and variables), depth and variables. */
export const HEADER = 3;
const WEIGHT = 1;
/** Depth · 1024 + b, where b is 0 without variables and else one more than the highest variable. */
const SHAPE = 2;
const VARIABLES = 1024;

export function grown(array: Int32Array, length: number): Int32Array {
  const longer = new Int32Array(Math.max(length, array.length * 2));
  longer.set(array);
  return longer;
}

export class TermBank {
  /** Names, numbers of arguments by symbol. */
  readonly names: string[] = ["="];
  readonly arities: number[] = [2];
  readonly isRelation: boolean[] = [true];
  /** The relations of no places that a run has brought in (`splitting.ts`). */
  readonly isName: boolean[] = [false];
  /** The terms one after another: {@link HEADER} words, then the arguments. Term 0 is left out. */
  words: Int32Array = new Int32Array(1 << 12);
  /** How many words are in use. */
  used = HEADER;
  /** How many terms there are. */
  count = 0;
  readonly #symbols = new Map<string, number>();
  /** Open addressing; 0 is free. */
  #table = new Int32Array(1 << 10);

  /** The symbol with a name and a number of arguments; a new one if there is none. */
  symbol(name: string, arity: number, isRelation: boolean): number {
    const key = `${isRelation ? "r" : "f"}${arity} ${name}`;
    const known = this.#symbols.get(key);
    if (known !== undefined) return known;
    this.names.push(name);
    this.arities.push(arity);
    this.isRelation.push(isRelation);
    this.isName.push(false);
    this.#symbols.set(key, this.names.length - 1);
    return this.names.length - 1;
  }

  /** A new relation of no places. */
  addName(name: string): number {
    const symbol = this.symbol(name, 0, true);
    this.isName[symbol] = true;
    return symbol;
  }

  /** The term of a symbol and the arguments that stand in `args` from `from` on. */
  make(symbol: number, args: Int32Array, from: number): number {
    const arity = this.arities[symbol]!;
    const table = this.#table;
    const mask = table.length - 1;
    let slot = hashOf(symbol, args, from, arity) & mask;
    for (let term = table[slot]!; term !== 0; term = table[slot]!) {
      if (this.#isSame(term, symbol, args, from, arity)) return term;
      slot = (slot + 1) & mask;
    }
    return this.#add(symbol, args, from, slot);
  }

  #isSame(term: number, symbol: number, args: Int32Array, from: number, arity: number): boolean {
    const words = this.words;
    if (words[term] !== symbol) return false;
    for (let k = 0; k < arity; k += 1) if (words[term + HEADER + k] !== args[from + k]) return false;
    return true;
  }

  #add(symbol: number, args: Int32Array, from: number, slot: number): number {
    const arity = this.arities[symbol]!;
    const term = this.used;
    if (term + HEADER + arity > this.words.length) this.words = grown(this.words, term + HEADER + arity);
    const words = this.words;
    let weight = 1;
    let depth = 0;
    let bound = 0;
    for (let k = 0; k < arity; k += 1) {
      const arg = args[from + k]!;
      words[term + HEADER + k] = arg;
      if (arg < 0) {
        weight += 1;
        if (-arg > bound) bound = -arg;
      } else {
        weight += words[arg + WEIGHT]!;
        const shape = words[arg + SHAPE]!;
        if (shape >> 10 >= depth) depth = (shape >> 10) + 1;
        if ((shape & (VARIABLES - 1)) > bound) bound = shape & (VARIABLES - 1);
      }
    }
    words[term] = symbol;
    words[term + WEIGHT] = weight;
    words[term + SHAPE] = (depth << 10) | bound;
    this.used = term + HEADER + arity;
    this.#table[slot] = term;
    this.count += 1;
    if (this.count * 2 > this.#table.length) this.#rehash();
    return term;
  }

  #rehash(): void {
    const table = new Int32Array(this.#table.length * 2);
    const mask = table.length - 1;
    for (const term of this.#table) {
      if (term === 0) continue;
      const symbol = this.words[term]!;
      let slot = hashOf(symbol, this.words, term + HEADER, this.arities[symbol]!) & mask;
      while (table[slot] !== 0) slot = (slot + 1) & mask;
      table[slot] = term;
    }
    this.#table = table;
  }

  weight(term: number): number {
    return term < 0 ? 1 : this.words[term + WEIGHT]!;
  }

  /** 0 for a variable or a constant, or an atom of such. */
  depth(term: number): number {
    return term < 0 ? 0 : this.words[term + SHAPE]! >> 10;
  }

  isGround(term: number): boolean {
    return term > 0 && (this.words[term + SHAPE]! & (VARIABLES - 1)) === 0;
  }

  /** One more than the highest variable of a term, 0 if there is none. */
  variables(term: number): number {
    return term < 0 ? -term : this.words[term + SHAPE]! & (VARIABLES - 1);
  }

  /** Whether a variable occurs in a term. */
  occurs(v: number, term: number): boolean {
    if (term < 0) return term === variable(v);
    const words = this.words;
    if ((words[term + SHAPE]! & (VARIABLES - 1)) <= v) return false;
    const end = term + HEADER + this.arities[words[term]!]!;
    for (let k = term + HEADER; k < end; k += 1) if (this.occurs(v, words[k]!)) return true;
    return false;
  }
}

function hashOf(symbol: number, args: Int32Array, from: number, arity: number): number {
  let hash = Math.imul(symbol + 1, 0x9e3779b1);
  for (let k = 0; k < arity; k += 1) {
    hash = Math.imul(hash ^ args[from + k]!, 0x85ebca6b);
    hash ^= hash >>> 13;
  }
  hash = Math.imul(hash, 0xc2b2ae35);
  return hash ^ (hash >>> 16);
}
