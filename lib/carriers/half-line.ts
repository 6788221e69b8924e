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
 *    r. Write S and T for S(r) and T(r), so that the positions of c and c′ are cut at S + T and their gaps at 2T. What is named
 *    below S + T is the same in both; let p be the greatest of it, if there is any. Let q and q′ be the least elements of c and
 *    c′ from S + T on; if there are none, c and c′ are the same, and a′ = a will do.
 *    - If a is an element of c, take that of c′. If a < p, take a: its neighbours are the same.
 *    - If a > q, choose a′ as on the integer line. Both a and a′ are greater than S.
 *    - Otherwise a < q, and a > p if there is a p. If a < S, take a: q − a and q′ − a are both greater than T.
 *    - If q − p < 2T, then q′ = q; take a. Otherwise, from here on, p does not exist or q − p and q′ − p are at least 2T; a is at
 *      least S, and all that is asked of the position of a′ is that it is at least S, too.
 *    - If q − a < T, let a′ = q′ − (q − a), which is greater than S. If there is a p, a − p and a′ − p are both greater than T.
 *    - If there is a p and a − p < T, take a: q − a and q′ − a are both greater than T.
 *    - Otherwise let a′ = q′ − T, which is at least S. If there is a p, a − p and a′ − p are both at least T.
 * 3. So configurations that are alike for r satisfy the same formulas of depth r, by induction as on the integer line, and
 *    it is enough to list, for a configuration that has been cut for r + 1, one of each class of extensions that are alike
 *    for r. These are all positions up to S or to T after the last element, whichever is greater: any number beyond is alike
 *    the last of these.
 *
 * No two of those, a < b, are alike for r. If a < S, their positions are told apart. If an element is equal to one of them or
 * lies between them, their order is. After the last element, they are at most T from it, since b > S. Before an element q that is
 * at most S + T, they are at most T from it. Before a greater q, whose gap to the element before has been cut at 2T, it is as on
 * the integer line.
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
