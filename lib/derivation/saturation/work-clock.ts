/** Keeps the meter looked at while no clauses are made. */
import type { Meter } from "../../logic/meter.ts";

/** Units of work (a unification, a match, a few words scanned) between two looks. */
const LOOKED_AT_EVERY = 2_048;

export class WorkClock {
  readonly #meter: Meter;
  #work = 0;

  constructor(meter: Meter) {
    this.#meter = meter;
  }

  /** @throws WorkEnded when the work is to end */
  tick(work: number): void {
    this.#work += work;
    if (this.#work < LOOKED_AT_EVERY) return;
    this.#work = 0;
    this.#meter.charge(0);
  }
}
