/**
 * A tree of patterns by which all those are found that a term is an instance of: a discrimination tree (McCune 1992)
 * whose edges are the symbols of the patterns in reading order, and their variables, numbered as they occur.
 */
import { grown, HEADER, type TermBank } from "./terms.ts";

/** Words of an edge in the table: node, label, node below; label v ≥ 0 is a symbol, −1 − v a variable. */
const EDGE = 3;
/** Variables below this have a bit in their node's mask. */
const MASKED = 31;

export class PatternTree {
  readonly #bank: TermBank;
  /** Open addressing by node and label; node 0 is the root, and a free edge leads to 0. */
  #edges = new Int32Array(EDGE << 8);
  #edgeCount = 0;
  /** By node: which variables lead on from it; bit 31 stands for all higher ones. */
  #masks: Int32Array = new Int32Array(64);
  /** By node: the first record of its patterns, counted from 1; 0 if none ends here. */
  #ends: Int32Array = new Int32Array(64);
  #nodes = 1;
  /** Records of a value and the next record. */
  #records: Int32Array = new Int32Array(64);
  #used = 1;

  /** The term asked for, in reading order: its subterms, and for each the place behind it. */
  #terms: Int32Array = new Int32Array(64);
  #behind: Int32Array = new Int32Array(64);
  #length = 0;
  /** What the variables passed on the way down stand for. */
  #images = new Int32Array(1024);
  #accept: (value: number) => boolean = () => false;

  constructor(bank: TermBank) {
    this.#bank = bank;
  }

  /** Nodes, by which its size in memory goes. */
  get size(): number {
    return this.#nodes;
  }

  get isEmpty(): boolean {
    return this.#used === 1;
  }

  add(pattern: number, value: number): void {
    this.#length = 0;
    this.#flatten(pattern);
    const numbers: number[] = [];
    let node = 0;
    for (let place = 0; place < this.#length; place += 1) {
      const term = this.#terms[place]!;
      let label: number;
      if (term < 0) {
        let number = numbers.indexOf(term);
        if (number < 0) number = numbers.push(term) - 1;
        label = -1 - number;
        this.#masks[node]! |= 1 << Math.min(number, MASKED);
      } else label = this.#bank.words[term]!;
      node = this.#childOrNew(node, label);
    }
    if (2 * this.#used + 2 > this.#records.length) this.#records = grown(this.#records, 2 * this.#used + 2);
    this.#records[2 * this.#used] = value;
    this.#records[2 * this.#used + 1] = 0;
    // Older patterns first, so that what is found depends on little.
    let last = this.#ends[node]!;
    if (last === 0) this.#ends[node] = this.#used;
    else {
      while (this.#records[2 * last + 1] !== 0) last = this.#records[2 * last + 1]!;
      this.#records[2 * last + 1] = this.#used;
    }
    this.#used += 1;
  }

  /** The value of a pattern that the term is an instance of, and that is accepted; -1 if there is none. */
  find(term: number, accept: (value: number) => boolean): number {
    this.#length = 0;
    this.#flatten(term);
    this.#accept = accept;
    return this.#find(0, 0, 0);
  }

  /** As {@link find} for the atom with its two arguments exchanged. */
  findExchanged(atom: number, accept: (value: number) => boolean): number {
    this.#length = 1;
    this.#terms[0] = atom;
    this.#flatten(this.#bank.words[atom + HEADER + 1]!);
    this.#flatten(this.#bank.words[atom + HEADER]!);
    this.#behind[0] = this.#length;
    this.#accept = accept;
    return this.#find(0, 0, 0);
  }

  #flatten(term: number): void {
    const place = this.#length++;
    if (this.#length > this.#terms.length) {
      this.#terms = grown(this.#terms, this.#length);
      this.#behind = grown(this.#behind, this.#length);
    }
    this.#terms[place] = term;
    if (term > 0) {
      const { words } = this.#bank;
      const end = term + HEADER + this.#bank.arities[words[term]!]!;
      for (let k = term + HEADER; k < end; k += 1) this.#flatten(words[k]!);
    }
    this.#behind[place] = this.#length;
  }

  #find(node: number, place: number, variables: number): number {
    if (place === this.#length) {
      for (let record = this.#ends[node]!; record !== 0; record = this.#records[2 * record + 1]!)
        if (this.#accept(this.#records[2 * record]!)) return this.#records[2 * record]!;
      return -1;
    }
    const term = this.#terms[place]!;
    const mask = this.#masks[node]!;
    if (mask !== 0)
      for (let v = 0; v <= variables; v += 1) {
        if ((mask & (1 << Math.min(v, MASKED))) === 0) continue;
        if (v === variables) this.#images[v] = term;
        else if (this.#images[v] !== term) continue;
        const below = this.#child(node, -1 - v);
        if (below === 0) continue;
        const found = this.#find(below, this.#behind[place]!, v === variables ? variables + 1 : variables);
        if (found >= 0) return found;
      }
    if (term < 0) return -1;
    const below = this.#child(node, this.#bank.words[term]!);
    return below === 0 ? -1 : this.#find(below, place + 1, variables);
  }

  #child(node: number, label: number): number {
    const edges = this.#edges;
    const slots = edges.length / EDGE;
    let slot = hashOf(node, label) & (slots - 1);
    for (;;) {
      const at = slot * EDGE;
      const below = edges[at + 2]!;
      if (below === 0 || (edges[at] === node && edges[at + 1] === label)) return below;
      slot = (slot + 1) & (slots - 1);
    }
  }

  #childOrNew(node: number, label: number): number {
    const known = this.#child(node, label);
    if (known !== 0) return known;
    const below = this.#nodes++;
    if (this.#nodes > this.#masks.length) {
      this.#masks = grown(this.#masks, this.#nodes);
      this.#ends = grown(this.#ends, this.#nodes);
    }
    this.#edgeCount += 1;
    if (this.#edgeCount * 2 > this.#edges.length / EDGE) {
      const old = this.#edges;
      this.#edges = new Int32Array(old.length * 2);
      for (let at = 0; at < old.length; at += EDGE)
        if (old[at + 2] !== 0) this.#enter(old[at]!, old[at + 1]!, old[at + 2]!);
    }
    this.#enter(node, label, below);
    return below;
  }

  #enter(node: number, label: number, below: number): void {
    const slots = this.#edges.length / EDGE;
    let slot = hashOf(node, label) & (slots - 1);
    while (this.#edges[slot * EDGE + 2] !== 0) slot = (slot + 1) & (slots - 1);
    this.#edges[slot * EDGE] = node;
    this.#edges[slot * EDGE + 1] = label;
    this.#edges[slot * EDGE + 2] = below;
  }
}

function hashOf(node: number, label: number): number {
  const hash = Math.imul(node, 0x9e3779b1) ^ Math.imul(label, 0x85ebca6b);
  return hash ^ (hash >>> 15);
}
