import type { HalfLineDescription } from "../logic/structure-definition.ts";
import { boundOf, cutGaps, gapThreshold } from "./gaps.ts";
import { Listed } from "./listed.ts";

/** The natural numbers that have been named, in the order of naming. */
export interface HalfLineConfiguration {
  readonly positions: readonly number[];
}

/**
 * The natural numbers, of which a table may tell 0, …, ends − 1 from all others and from each other, and the differences
 * −offset, …, offset of two; for the rest only which is the smaller. A kind is the order of the elements with the gaps
 * between neighbours, cut at offset + 1, and the position of each, cut at ends.
 *
 * Why the extensions suffice (the game of Fraïssé 1954 and Ehrenfeucht 1961). Let T(r) = 2^r · (offset + 1) as on the
 * integer line, S(0) = ends and S(r + 1) = S(r) + T(r), so that S(r) = ends + (2^r − 1) · (offset + 1). Call two
 * configurations of the same length alike for r when they have the same order, with the same repeats, the same gaps
 * between neighbours, cut at T(r), and element by element the same position, cut at S(r).
 *
 * 1. Alike for 0 means of the same kind, and then so are all tuples of their elements, as on the integer line.
 * 2. If c and c′ are alike for r + 1, then for every number a there is an a′ so that c with a and c′ with a′ are alike for
 *    r. Write S, T for S(r), T(r). The elements of c and c′ below S + T are the same; the others of both are at least S + T.
 *    Let p be the largest below (if there is one) and q, q′ the least others (if there are any).
 *    - If a is an element of c, take that of c′.
 *    - If a > p and there is no q, or a lies below p, take a itself: there both configurations are the same. (If there is no
 *      p either, nothing is named, or a lies after no element: covered by the next cases.)
 *    - If a is greater than q, it splits a gap between elements that are all at least S + T, or lies after all of them:
 *      choose a′ as on the integer line; both are at least S.
 *    - There remain p < a < q, or a < q without a p. If a < S take a′ = a: then q − a and q′ − a are both more than T, and the
 *      gap after p and the position are the same. From now on a ≥ S, and it is enough that a′ ≥ S.
 *      If q − a < T, let a′ = q′ − (q − a): that is more than S. Where there is a p and q ≠ q′, both gaps after p are at least 2T, so
 *      that a − p and a′ − p are both more than T; if q = q′, then a′ = a.
 *      If q − a ≥ T, there is no p, or the gaps after p are at least 2T and a − p ≥ T: let a′ = q′ − T: that is at least S, and
 *      a′ − p ≥ T. If q − a ≥ T and a − p < T, let a′ = a: since q′ − p ≥ 2T, q′ − a > T. If the gaps after p are less than 2T,
 *      they are equal, so q = q′ and a′ = a.
 * 3. So configurations that are alike for r satisfy the same formulas of depth r, by induction as on the integer line, and
 *    it is enough to list, for a configuration that has been cut for r + 1, one of each class of extensions that are alike
 *    for r: all positions up to the greater of S and T more than the last element.
 *
 * No two of those are alike for r: below S they differ in their positions. From S on, after the last element they differ in
 * the distance to it, at most T, or are S itself; before an element q that is at most S + T they differ in the distance to q, at
 * most T; and a greater q has been moved down until the gap before it is at most 2T, where positions differ as on the integer line.
 */
export class HalfLine extends Listed<HalfLineConfiguration> {
  readonly description: HalfLineDescription;
  readonly empty: HalfLineConfiguration = { positions: [] };

  constructor(description: HalfLineDescription) {
    super();
    this.description = description;
  }

  protected list({ positions }: HalfLineConfiguration, toCome: number): readonly HalfLineConfiguration[] {
    const cut = this.#cut(positions, toCome + 1);
    const within = gapThreshold(this.description.offset, toCome);
    const last = Math.max(this.#end(toCome), ...cut.map((position) => position + within));
    const extensions: HalfLineConfiguration[] = [];
    for (let position = 0; position <= last; position += 1)
      extensions.push({ positions: this.#cut([...cut, position], toCome) });
    return extensions;
  }

  restrict({ positions }: HalfLineConfiguration, places: readonly number[]): HalfLineConfiguration {
    return { positions: places.map((place) => positions[place]!) };
  }

  same({ positions }: HalfLineConfiguration, first: number, second: number): boolean {
    return positions[first] === positions[second];
  }

  key({ positions }: HalfLineConfiguration, toCome: number): string {
    return this.#cut(positions, toCome).join();
  }

  protected kindName(configuration: HalfLineConfiguration): string {
    return this.key(configuration, 0);
  }

  /** Of so many elements the last is at most S(toCome + 1) + (named − 1) · T(toCome + 1). */
  mostExtensions(named: number, toCome: number): number {
    if (named === 0) return boundOf(this.#end(toCome) + 1);
    const within = gapThreshold(this.description.offset, toCome);
    return boundOf(this.#end(toCome + 1) + (2 * named - 1) * within + 1);
  }

  /** S(toCome): from which position on elements need not be told apart by their positions. */
  #end(toCome: number): number {
    const { offset, ends } = this.description;
    return ends + gapThreshold(offset, toCome) - (offset + 1);
  }

  #cut(positions: readonly number[], toCome: number): readonly number[] {
    return cutGaps(positions, gapThreshold(this.description.offset, toCome), this.#end(toCome));
  }
}
