/** A set of canonical forms of one shape, kept close together: counting may meet millions of them. */
import type { Meter } from "../logic/meter.ts";

/** Bytes that the forms of one count may take together before it gives up with the reason `memory`. */
const BYTES_BOUND = 400_000_000;
/** Bytes of the index for each form, at most. */
const INDEX_BYTES = 16;

export class FormSet {
  /** Bytes of a form; all forms of one shape are equally long. */
  readonly #length: number;
  readonly #bound: number;
  /** The forms, one after another. */
  #bytes: Uint8Array;
  #count = 0;
  /** Open addressing: 1 + the number of a form, 0 where empty. Its length is a power of two. */
  #index = new Int32Array(1024);

  /**
   * @param length bytes of every form, at least 1
   * @param bound bytes that all forms may take together
   */
  constructor(length: number, bound: number = BYTES_BOUND) {
    this.#length = length;
    this.#bound = bound;
    this.#bytes = new Uint8Array(length * 64);
  }

  get size(): number {
    return this.#count;
  }

  /**
   * Adds a form; whether it is new.
   * @throws WorkEnded with the reason `memory` when there are too many
   */
  add(form: Uint8Array, meter: Meter): boolean {
    const length = this.#length;
    const mask = this.#index.length - 1;
    let slot = hash(form, 0, length) & mask;
    for (; this.#index[slot] !== 0; slot = (slot + 1) & mask)
      if (this.#isAt(form, this.#index[slot]! - 1)) return false;
    if ((this.#count + 1) * (length + INDEX_BYTES) > this.#bound) meter.endForMemory();
    const from = this.#count * length;
    if (from + length > this.#bytes.length) {
      const larger = new Uint8Array(this.#bytes.length * 2);
      larger.set(this.#bytes);
      this.#bytes = larger;
    }
    for (let at = 0; at < length; at += 1) this.#bytes[from + at] = form[at]!;
    this.#count += 1;
    this.#index[slot] = this.#count;
    if (this.#count * 2 > this.#index.length) this.#growIndex();
    return true;
  }

  #isAt(form: Uint8Array, number: number): boolean {
    const from = number * this.#length;
    for (let at = 0; at < this.#length; at += 1) if (this.#bytes[from + at] !== form[at]) return false;
    return true;
  }

  #growIndex(): void {
    this.#index = new Int32Array(this.#index.length * 2);
    const mask = this.#index.length - 1;
    for (let number = 0; number < this.#count; number += 1) {
      let slot = hash(this.#bytes, number * this.#length, this.#length) & mask;
      while (this.#index[slot] !== 0) slot = (slot + 1) & mask;
      this.#index[slot] = number + 1;
    }
  }
}

function hash(bytes: Uint8Array, from: number, length: number): number {
  let value = length;
  for (let at = from; at < from + length; at += 1)
    value = Math.imul(value ^ bytes[at]!, 0x9e3779b1 | 0) ^ (value >>> 15);
  return value ^ (value >>> 13);
}
