/** A meter for a part of some work, which pays from the meter of the whole. */
import { type EndReason, Meter } from "./meter.ts";

export class MeterShare {
  readonly meter: Meter;
  readonly #whole: Meter;
  /** Thousandths of a step that the part had left when the whole was last told. */
  #told: number;

  /** @param limit steps that the part may spend; not more than the whole has left */
  constructor(whole: Meter, limit: number) {
    const steps = Math.max(1, Math.floor(Math.min(limit, whole.left / 1000)));
    this.#whole = whole;
    this.meter = new Meter(steps, () => !this.#tell());
    this.#told = this.meter.left;
  }

  /** Tells the whole of work that it has not heard of yet; whether the whole may go on. Call it when the part is done. */
  settle(): boolean {
    return this.#tell();
  }

  /** Why the part ended; that the whole was interrupted or has nothing left goes before that the share is spent. */
  get ended(): EndReason | null {
    return this.#whole.ended ?? this.meter.ended;
  }

  #tell(): boolean {
    const spent = this.#told - this.meter.left;
    this.#told = this.meter.left;
    return this.#whole.spend(spent);
  }
}
