import type { TuplesDescription } from "../logic/structure-definition.ts";
import type { Carrier, Symmetry } from "./carrier.ts";
import { exchanged, pairsWithSame } from "./groups.ts";
import { kindExamplesOf } from "./kind-examples.ts";
import { KindSymmetry } from "./kind-symmetry.ts";
import { Listed } from "./listed.ts";

export interface TuplesConfiguration {
  /** The tag of each element. */
  readonly tags: readonly number[];
  /** The configuration, in the carrier of the coordinates, of all coordinates of the first element, then of the second, … */
  readonly base: unknown;
}

/**
 * Tagged tuples: the elements with tag t are the tuples of `widths[t]` elements of another carrier.
 *
 * Why the extensions suffice: to name an element with tag t is to name its coordinates one after another, at most W of
 * them for W the largest width. Let tuples with the same tags be alike for r elements to come when all their
 * coordinates together are alike for r·W elements of the other carrier to come. Of two tuples that are alike for r + 1
 * let one be extended by an element of width w ≤ W. What is alike for (r + 1)·W is alike for r·W + w, so by the law of the
 * other carrier each of its coordinates in turn is answered in the other tuple, the i-th (from 0) with r·W + w − 1 − i to
 * come, and in the end all coordinates are alike for r·W. Likewise the other way round. So r moves in the game of
 * Ehrenfeucht and Fraïssé are answered, and the listed extensions represent all. This is the usual proof that what is
 * interpreted in a structure, here with tags and in dimension W, inherits from it what can be told apart (common
 * practice; Hodges, Model Theory, 1993, chapter 5). Tuples that are alike for 0 have the same tags, and their coordinates
 * are of the same kind, which tells which of the elements are the same.
 *
 * Kinds are numbered by the tags in lexicographic order, then by the kind of all coordinates.
 */
export class Tuples extends Listed<TuplesConfiguration> {
  readonly description: TuplesDescription;
  override readonly size: number | null;
  readonly empty: TuplesConfiguration;
  /** What the coordinates are elements of. */
  readonly over: Carrier;
  readonly #widths: readonly number[];
  readonly #widest: number;
  /** By how many elements are to come and how many coordinates there are: how many kinds there are with given tags so far. */
  readonly #counts: (number | undefined)[][] = [];

  constructor(description: TuplesDescription, over: Carrier) {
    super();
    this.description = description;
    this.over = over;
    this.#widths = description.widths;
    this.#widest = Math.max(...description.widths);
    const { size } = over;
    this.size =
      size === null && this.#widest > 0
        ? null
        : this.#widths.reduce((sum, width) => sum + (width === 0 ? 1 : size! ** width), 0);
    this.empty = { tags: [], base: over.empty };
  }

  protected list({ tags, base }: TuplesConfiguration, toCome: number): readonly TuplesConfiguration[] {
    return this.#widths.flatMap((width, tag) => {
      const longer = [...tags, tag];
      let bases: readonly unknown[] = [base];
      for (let left = width - 1; left >= 0; left -= 1)
        bases = bases.flatMap((one) => this.over.extensions(one, toCome * this.#widest + left));
      if (width > 1) bases = this.#withoutAlike(bases, toCome * this.#widest);
      return bases.map((extended) => ({ tags: longer, base: extended }));
    });
  }

  restrict({ tags, base }: TuplesConfiguration, places: readonly number[]): TuplesConfiguration {
    return {
      tags: places.map((place) => tags[place]!),
      base: this.over.restrict(base, this.#coordinates(tags, places)),
    };
  }

  same({ tags, base }: TuplesConfiguration, first: number, second: number): boolean {
    if (tags[first] !== tags[second]) return false;
    const [one, other] = [this.#start(tags, first), this.#start(tags, second)];
    for (let i = 0; i < this.#widths[tags[first]!]!; i += 1)
      if (!this.over.same(base, one + i, other + i)) return false;
    return true;
  }

  key({ tags, base }: TuplesConfiguration, toCome: number): string {
    return `${tags.join()};${this.over.key(base, toCome * this.#widest)}`;
  }

  mostExtensions(named: number, toCome: number): number {
    let sum = 0;
    for (const width of this.#widths) {
      let product = 1;
      for (let i = 0; i < width; i += 1)
        product *= this.over.mostExtensions(named * this.#widest + i, toCome * this.#widest + width - 1 - i);
      sum += product;
    }
    return sum;
  }

  override kindCount(length: number): number {
    return this.#count(length, 0);
  }

  protected override findKind({ tags, base }: TuplesConfiguration, places: readonly number[]): number {
    const before = this.#kindsBefore(places.map((place) => tags[place]!));
    return before + this.over.kindOf(base, this.#coordinates(tags, places));
  }

  protected kindName(configuration: TuplesConfiguration): string {
    return `${this.findKind(configuration, [...configuration.tags.keys()])}`;
  }

  override kindExamples(length: number): readonly TuplesConfiguration[] {
    const examples: TuplesConfiguration[] = [];
    const extend = (tags: readonly number[], coordinates: number): void => {
      if (tags.length < length)
        for (const [tag, width] of this.#widths.entries()) extend([...tags, tag], coordinates + width);
      else for (const base of kindExamplesOf(this.over, coordinates)) examples.push({ tags, base });
    };
    extend([], 0);
    return examples;
  }

  /** The exchanges of two tags of the same width. */
  override symmetries(): readonly Symmetry[] {
    return pairsWithSame(this.#widths).map(
      ([first, second]) =>
        new KindSymmetry<TuplesConfiguration>(this, ({ tags, base }) => ({
          tags: tags.map((tag) => exchanged(tag, first, second)),
          base,
        })),
    );
  }

  /** Where the coordinates of an element are in the configuration of all: it, and as many more as it is wide. */
  coordinatesOf({ tags }: TuplesConfiguration, place: number): readonly number[] {
    return this.#coordinates(tags, [place]);
  }

  /** The first of each class of configurations of coordinates that need not be told apart. */
  #withoutAlike(bases: readonly unknown[], toCome: number): readonly unknown[] {
    const seen = new Set<string | number>();
    return bases.filter((base) => {
      const key = this.over.key(base, toCome);
      if (seen.has(key)) return false;
      seen.add(key);
      return true;
    });
  }

  #start(tags: readonly number[], place: number): number {
    let start = 0;
    for (let before = 0; before < place; before += 1) start += this.#widths[tags[before]!]!;
    return start;
  }

  #coordinates(tags: readonly number[], places: readonly number[]): readonly number[] {
    const coordinates: number[] = [];
    for (const place of places) {
      const start = this.#start(tags, place);
      for (let i = 0; i < this.#widths[tags[place]!]!; i += 1) coordinates.push(start + i);
    }
    return coordinates;
  }

  /** How many kinds there are of tuples whose first elements, of given tags, have so many coordinates. */
  #count(toCome: number, coordinates: number): number {
    this.#counts[toCome] ??= [];
    const counts = this.#counts[toCome];
    let count = counts[coordinates];
    if (count === undefined) {
      count = 0;
      if (toCome === 0) count = this.over.kindCount(coordinates);
      else for (const width of this.#widths) count += this.#count(toCome - 1, coordinates + width);
      counts[coordinates] = count;
    }
    return count;
  }

  /** How many kinds of tuples as long come before all with these tags. */
  #kindsBefore(tags: readonly number[]): number {
    let before = 0;
    let coordinates = 0;
    tags.forEach((tag, place) => {
      const toCome = tags.length - 1 - place;
      for (let lesser = 0; lesser < tag; lesser += 1)
        before += this.#count(toCome, coordinates + this.#widths[lesser]!);
      coordinates += this.#widths[tag]!;
    });
    return before;
  }
}
