import type { IntegerLineDescription } from "../logic/structure-definition.ts";
import { boundOf, cutGaps, gapThreshold } from "./gaps.ts";
import { Listed } from "./listed.ts";

/** The integers that have been named, in the order of naming. */
export interface IntegerConfiguration {
  /** Where each stands, up to moving all of them by the same number of steps. */
  readonly positions: readonly number[];
}

/**
 * The integers, of which a table may tell the differences −offset, …, offset of two apart, and for the rest only which
 * is the smaller. A kind is the order of the elements with the gaps between neighbours, cut at offset + 1.
 *
 * Why the extensions suffice (Ehrenfeucht 1961, who did it for the order alone; the game is Fraïssé's 1954). Let
 * T(r) = 2^r · (offset + 1). Call two configurations of the same length alike for r when they have the same order, with
 * the same repeats, and the same gaps between neighbours, cut at T(r).
 *
 * 1. Alike for 0 means of the same kind, and so are then all tuples of their elements: a difference is the sum of the
 *    gaps between, and the sum, cut at T, is determined by the gaps, cut at T.
 * 2. If c and c′ are alike for r + 1, then for every element a of the line there is an a′ so that c with a and c′ with a′
 *    are alike for r. If a is an element of c, take that of c′. If it is left or right of all, take the same distance to
 *    the outermost one. Otherwise a splits a gap g = g₁ + g₂ of c, and with g′ the gap of c′ at the same place,
 *    min(g, 2T) = min(g′, 2T), where T = T(r). If g < 2T then g′ = g; split it in the same way. Otherwise both are at least
 *    2T. If g₁ < T, let g₁′ = g₁; then g₂ and g′ − g₁ are both greater than T. If g₂ < T, likewise from the other side. If
 *    both are at least T, let g₁′ = T; then g′ − T is at least T. The other gaps are as before, alike for r since they
 *    are for r + 1.
 * 3. So configurations that are alike for r satisfy the same formulas of depth r, by induction: for atoms by 1, for a
 *    quantifier by 2 in both directions. Therefore it is enough to list, for a configuration whose gaps have been cut at
 *    T(r + 1), one of each class of extensions that are alike for r: these are all positions from T(r) left of the first
 *    element to T(r) right of the last.
 *
 * No two of those are alike for r: outside they have different distances, at most T, from the outermost element. Two that
 * split a gap of at most 2T into g₁ + g₂ and h₁ + h₂ with g₁ < h₁ differ before the cut if g₁ < T, and otherwise after it, since
 * then h₂ < g₂ ≤ T.
 *
 * Smaller thresholds would not do: that a gap is at least 2T is said, with one quantifier more, by an element that has
 * gaps of at least T on either side, and for offset 0 the bound is the classical one for orders, where 2^r − 1 elements
 * between two cannot be told from more.
 */
export class IntegerLine extends Listed<IntegerConfiguration> {
  readonly description: IntegerLineDescription;
  readonly empty: IntegerConfiguration = { positions: [] };

  constructor(description: IntegerLineDescription) {
    super();
    this.description = description;
  }

  protected list({ positions }: IntegerConfiguration, toCome: number): readonly IntegerConfiguration[] {
    if (positions.length === 0) return [{ positions: [0] }];
    const within = gapThreshold(this.description.offset, toCome);
    const cut = this.#cut(positions, toCome + 1);
    const last = Math.max(...cut) + within;
    const extensions: IntegerConfiguration[] = [];
    for (let position = -within; position <= last; position += 1)
      extensions.push({ positions: this.#cut([...cut, position], toCome) });
    return extensions;
  }

  restrict({ positions }: IntegerConfiguration, places: readonly number[]): IntegerConfiguration {
    return { positions: places.map((place) => positions[place]!) };
  }

  same({ positions }: IntegerConfiguration, first: number, second: number): boolean {
    return positions[first] === positions[second];
  }

  key({ positions }: IntegerConfiguration, toCome: number): string {
    return this.#cut(positions, toCome).join();
  }

  protected kindName(configuration: IntegerConfiguration): string {
    return this.key(configuration, 0);
  }

  /** Of so many elements the outermost are at most (named − 1) · T(toCome + 1) apart. */
  mostExtensions(named: number, toCome: number): number {
    if (named === 0) return 1;
    return boundOf(2 * named * gapThreshold(this.description.offset, toCome) + 1);
  }

  /** The positions from the first, which becomes 0, with gaps cut. */
  #cut(positions: readonly number[], toCome: number): readonly number[] {
    const first = Math.min(...positions);
    const largest = gapThreshold(this.description.offset, toCome);
    return cutGaps(
      positions.map((position) => position - first),
      largest,
      0,
    );
  }
}
