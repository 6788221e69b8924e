/** Symmetries of infinite carriers, by what they do to configurations. */
import type { Symmetry } from "./carrier.ts";
import type { Listed } from "./listed.ts";

/** A permutation of a carrier that takes tuples of one kind to tuples of one kind. */
export class KindSymmetry<Configuration extends object> implements Symmetry {
  readonly #carrier: Listed<Configuration>;
  readonly #change: (configuration: Configuration) => Configuration;
  /** By length: to which kind each kind goes. */
  readonly #images: (readonly number[])[] = [];

  /** @param change from the configuration of a tuple to that of its image */
  constructor(carrier: Listed<Configuration>, change: (configuration: Configuration) => Configuration) {
    this.#carrier = carrier;
    this.#change = change;
  }

  image(length: number, kind: number): number {
    const places = Array.from({ length }, (_, place) => place);
    this.#images[length] ??= this.#carrier
      .kindExamples(length)
      .map((example) => this.#carrier.kindOf(this.#change(example), places));
    return this.#images[length][kind]!;
  }
}
