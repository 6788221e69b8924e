/** Instances that wait for their turn: light and old ones first. */
import type { Instance } from "./instances.ts";

/** A symbol more is worth so many instances of age: in what comes from the negated conclusion, and elsewhere. */
const GOAL_WEIGHT = 1;
const OTHER_WEIGHT = 3;

/** A heap; ties are broken by age, so that the order is the same in every run. */
export class WaitingList {
  readonly #heap: Instance[] = [];

  get size(): number {
    return this.#heap.length;
  }

  add(instance: Instance): void {
    const heap = this.#heap;
    let place = heap.push(instance) - 1;
    while (place > 0) {
      const parent = (place - 1) >> 1;
      if (!isBefore(instance, heap[parent]!)) break;
      heap[place] = heap[parent]!;
      place = parent;
    }
    heap[place] = instance;
  }

  /** Takes the first one; null when there is none. */
  take(): Instance | null {
    const heap = this.#heap;
    const first = heap[0];
    const last = heap.pop();
    if (first === undefined || last === undefined) return null;
    if (heap.length === 0) return first;
    let place = 0;
    for (;;) {
      let child = 2 * place + 1;
      if (child >= heap.length) break;
      if (child + 1 < heap.length && isBefore(heap[child + 1]!, heap[child]!)) child += 1;
      if (!isBefore(heap[child]!, last)) break;
      heap[place] = heap[child]!;
      place = child;
    }
    heap[place] = last;
    return first;
  }
}

function isBefore(left: Instance, right: Instance): boolean {
  const difference = keyOf(left) - keyOf(right);
  return difference < 0 || (difference === 0 && left.number < right.number);
}

function keyOf({ base, weight, number }: Instance): number {
  return weight * (base.goal ? GOAL_WEIGHT : OTHER_WEIGHT) + number;
}
