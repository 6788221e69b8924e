import { grownInt32 } from "./literals.ts";

/**
 * A binary heap of variables, the most active on top; equally active ones in the order in which they came in, as
 * far as a heap keeps it. The activities belong to the caller, who calls {@link raised} after increasing one.
 */
export class VariableHeap {
  /** By variable. Shared with the caller, who puts a longer array here when variables are added. */
  activity: Float64Array;
  /** The heap: the children of entry i are 2i + 1 and 2i + 2. */
  #entries: Int32Array = new Int32Array(8);
  /** By variable: its index in the heap, −1 when it is not there. */
  #index: Int32Array = new Int32Array(8).fill(-1);
  #size = 0;

  constructor(activity: Float64Array) {
    this.activity = activity;
  }

  get size(): number {
    return this.#size;
  }

  /** Makes room for variables below `variables`. */
  reserve(variables: number): void {
    this.#entries = grownInt32(this.#entries, variables);
    this.#index = grownInt32(this.#index, variables, -1);
  }

  has(variable: number): boolean {
    return this.#index[variable]! >= 0;
  }

  insert(variable: number): void {
    if (this.#index[variable]! >= 0) return;
    this.#rise(this.#size, variable);
    this.#size += 1;
  }

  /** Restores the order after the activity of a variable has grown. */
  raised(variable: number): void {
    const index = this.#index[variable]!;
    if (index > 0) this.#rise(index, variable);
  }

  /** Takes out the most active variable; the heap must not be empty. */
  pop(): number {
    const top = this.#entries[0]!;
    this.#index[top] = -1;
    this.#size -= 1;
    if (this.#size > 0) this.#sink(this.#entries[this.#size]!);
    return top;
  }

  clear(): void {
    for (let index = 0; index < this.#size; index += 1) this.#index[this.#entries[index]!] = -1;
    this.#size = 0;
  }

  #rise(from: number, variable: number): void {
    const entries = this.#entries;
    const { activity } = this;
    const own = activity[variable]!;
    let index = from;
    while (index > 0) {
      const parent = (index - 1) >> 1;
      const above = entries[parent]!;
      if (activity[above]! >= own) break;
      entries[index] = above;
      this.#index[above] = index;
      index = parent;
    }
    entries[index] = variable;
    this.#index[variable] = index;
  }

  /** Puts a variable at the top and lets it sink to its place. */
  #sink(variable: number): void {
    const entries = this.#entries;
    const { activity } = this;
    const size = this.#size;
    const own = activity[variable]!;
    let index = 0;
    for (;;) {
      let child = index * 2 + 1;
      if (child >= size) break;
      if (child + 1 < size && activity[entries[child + 1]!]! > activity[entries[child]!]!) child += 1;
      const below = entries[child]!;
      if (activity[below]! <= own) break;
      entries[index] = below;
      this.#index[below] = index;
      index = child;
    }
    entries[index] = variable;
    this.#index[variable] = index;
  }
}
