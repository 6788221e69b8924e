/**
 * Propositional formulas as circuits of conjunctions and negations in which equal gates are one.
 *
 * A reference is a signed whole number: `g` for the gate or input number g, `−g` for its negation. Number 1 is the
 * constant true, so `−1` is false. Inputs and gates share the numbering.
 */
import type { Meter } from "../logic/meter.ts";

export type Reference = number;
export const TRUE: Reference = 1;
export const FALSE: Reference = -1;

/** Where clauses go: the solver, or a list of them. Literals are DIMACS literals. */
export interface ClauseSink {
  newVariable(): number;
  addClause(literals: readonly number[]): unknown;
}

/** Children of gates that a circuit may hold before it gives up with the reason `memory`. */
const CHILDREN_BOUND = 30_000_000;

export class Circuit {
  /**
   * The children of node k are those from `#starts[k]` to before `#starts[k + 1]` in `#children`; none for inputs
   * and for node 1, the constant. There is no node 0.
   */
  readonly #starts: number[] = [0, 0, 0];
  /** The children of all gates, one gate after another, each gate's in ascending order. */
  #children = new Int32Array(1024);
  #used = 0;
  /** Open addressing over gate numbers, 0 where empty. Its length is a power of two. */
  #index = new Int32Array(2048);
  #gates = 0;
  readonly #meter: Meter;

  constructor(meter: Meter) {
    this.#meter = meter;
  }

  /** How many nodes there are; the highest number in use. */
  get nodeCount(): number {
    return this.#starts.length - 2;
  }

  newInput(): Reference {
    this.#starts.push(this.#used);
    return this.nodeCount;
  }

  isGate(reference: Reference): boolean {
    const node = Math.abs(reference);
    return this.#starts[node + 1]! > this.#starts[node]!;
  }

  /** The references whose conjunction the gate with that number is. */
  childrenOf(node: number): Int32Array {
    return this.#children.subarray(this.#starts[node]!, this.#starts[node + 1]!);
  }

  or(references: readonly Reference[]): Reference {
    return -this.and(references.map((reference) => -reference));
  }

  /** The conjunction, simplified: constants and repeats left out, contradictory references found. */
  and(references: readonly Reference[]): Reference {
    const sorted = Int32Array.from(references).sort();
    let count = 0;
    for (let i = 0; i < sorted.length; i += 1) {
      const reference = sorted[i]!;
      if (reference === FALSE) return FALSE;
      if (reference === TRUE || (count > 0 && sorted[count - 1] === reference)) continue;
      sorted[count] = reference;
      count += 1;
    }
    // References ascend, so x and −x stand at mirrored places: walk inwards from both ends.
    for (let low = 0, high = count - 1; low < high; ) {
      const sum = sorted[low]! + sorted[high]!;
      if (sum === 0) return FALSE;
      if (sum < 0) low += 1;
      else high -= 1;
    }
    if (count === 0) return TRUE;
    if (count === 1) return sorted[0]!;
    return this.#gate(sorted.subarray(0, count));
  }

  #gate(children: Int32Array): Reference {
    let slot = hash(children) & (this.#index.length - 1);
    for (; this.#index[slot] !== 0; slot = (slot + 1) & (this.#index.length - 1)) {
      const gate = this.#index[slot]!;
      if (sameChildren(this.childrenOf(gate), children)) return gate;
    }
    if (this.#used + children.length > CHILDREN_BOUND) this.#meter.endForMemory();
    if (this.#used + children.length > this.#children.length) {
      const larger = new Int32Array(Math.max(this.#children.length * 2, this.#used + children.length));
      larger.set(this.#children.subarray(0, this.#used));
      this.#children = larger;
    }
    this.#children.set(children, this.#used);
    this.#used += children.length;
    this.#starts.push(this.#used);
    const gate = this.nodeCount;
    this.#index[slot] = gate;
    this.#gates += 1;
    if (this.#gates * 2 > this.#index.length) this.#growIndex();
    return gate;
  }

  #growIndex(): void {
    const old = this.#index;
    this.#index = new Int32Array(old.length * 2);
    const mask = this.#index.length - 1;
    for (const gate of old) {
      if (gate === 0) continue;
      let slot = hash(this.childrenOf(gate)) & mask;
      while (this.#index[slot] !== 0) slot = (slot + 1) & mask;
      this.#index[slot] = gate;
    }
  }
}

function hash(children: Int32Array): number {
  let value = children.length;
  for (const child of children) {
    value = Math.imul(value ^ child, 0x9e3779b1);
    value ^= value >>> 15;
  }
  return value >>> 0;
}

function sameChildren(left: Int32Array, right: Int32Array): boolean {
  return left.length === right.length && left.every((child, index) => child === right[index]);
}
