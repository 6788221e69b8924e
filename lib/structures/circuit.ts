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
  /** Told how many variables are coming, where that is known. */
  reserve?(variables: number): void;
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
  /** References about to become a gate. */
  #scratch = new Int32Array(64);
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

  and(first: Reference, second: Reference): Reference {
    this.#scratch[0] = first;
    this.#scratch[1] = second;
    return this.#simplified(2);
  }

  or(first: Reference, second: Reference): Reference {
    return -this.and(-first, -second);
  }

  /** The conjunction of any number of references. */
  conjunction(references: readonly Reference[]): Reference {
    if (references.length > this.#scratch.length) this.#scratch = new Int32Array(references.length * 2);
    for (let i = 0; i < references.length; i += 1) this.#scratch[i] = references[i]!;
    return this.#simplified(references.length);
  }

  /**
   * The conjunction of the first references in the scratch array, which it reorders: constants and repeats are left
   * out, contradictory references found.
   */
  #simplified(length: number): Reference {
    const scratch = this.#scratch;
    sortFront(scratch, length);
    let count = 0;
    for (let i = 0; i < length; i += 1) {
      const reference = scratch[i]!;
      if (reference === FALSE) return FALSE;
      if (reference === TRUE || (count > 0 && scratch[count - 1] === reference)) continue;
      scratch[count] = reference;
      count += 1;
    }
    // References ascend, so x and −x stand at mirrored places: walk inwards from both ends.
    for (let low = 0, high = count - 1; low < high; ) {
      const sum = scratch[low]! + scratch[high]!;
      if (sum === 0) return FALSE;
      if (sum < 0) low += 1;
      else high -= 1;
    }
    if (count === 0) return TRUE;
    return count === 1 ? scratch[0]! : this.#gate(count);
  }

  /** The gate whose children are the first references in the scratch array, made if it is new. */
  #gate(length: number): Reference {
    const scratch = this.#scratch;
    const mask = this.#index.length - 1;
    let slot = hash(scratch, 0, length) & mask;
    for (; this.#index[slot] !== 0; slot = (slot + 1) & mask)
      if (this.#hasChildren(this.#index[slot]!, length)) return this.#index[slot]!;
    if (this.#used + length > CHILDREN_BOUND) this.#meter.endForMemory();
    if (this.#used + length > this.#children.length) {
      const larger = new Int32Array(Math.max(this.#children.length * 2, this.#used + length));
      larger.set(this.#children.subarray(0, this.#used));
      this.#children = larger;
    }
    for (let i = 0; i < length; i += 1) this.#children[this.#used + i] = scratch[i]!;
    this.#used += length;
    this.#starts.push(this.#used);
    const gate = this.nodeCount;
    this.#index[slot] = gate;
    this.#gates += 1;
    if (this.#gates * 2 > this.#index.length) this.#growIndex();
    return gate;
  }

  #hasChildren(gate: number, length: number): boolean {
    const start = this.#starts[gate]!;
    if (this.#starts[gate + 1]! - start !== length) return false;
    for (let i = 0; i < length; i += 1) if (this.#children[start + i] !== this.#scratch[i]) return false;
    return true;
  }

  #growIndex(): void {
    const old = this.#index;
    this.#index = new Int32Array(old.length * 2);
    const mask = this.#index.length - 1;
    for (const gate of old) {
      if (gate === 0) continue;
      let slot = hash(this.#children, this.#starts[gate]!, this.#starts[gate + 1]!) & mask;
      while (this.#index[slot] !== 0) slot = (slot + 1) & mask;
      this.#index[slot] = gate;
    }
  }
}

/** References up to which insertion beats the library's sort. */
const FEW = 16;

function sortFront(array: Int32Array, length: number): void {
  if (length > FEW) {
    array.subarray(0, length).sort();
    return;
  }
  for (let i = 1; i < length; i += 1) {
    const value = array[i]!;
    let place = i;
    for (; place > 0 && array[place - 1]! > value; place -= 1) array[place] = array[place - 1]!;
    array[place] = value;
  }
}

function hash(array: Int32Array, from: number, to: number): number {
  let value = to - from;
  for (let i = from; i < to; i += 1) {
    value = Math.imul(value ^ array[i]!, 0x9e3779b1);
    value ^= value >>> 15;
  }
  return value >>> 0;
}
