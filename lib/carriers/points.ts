import type { PointsDescription } from "../logic/structure-definition.ts";
import type { Carrier, Symmetry } from "./carrier.ts";

/** Points beyond which only neighbours are exchanged to break symmetry. */
const MANY_POINTS = 40;

/** The points that have been named, each from 0 to n − 1, in the order of naming. */
export type PointsConfiguration = readonly number[];

/**
 * The finite domain of n points. A configuration is the list of the points named; a kind is a tuple of points, read
 * as a number in base n: the pair (i, j) of points counted from 0 is kind `i·n + j`.
 *
 * Why the extensions suffice: they are all n elements, so that quantifiers range over the domain itself.
 */
export class Points implements Carrier<PointsConfiguration> {
  readonly description: PointsDescription;
  readonly size: number;
  readonly empty: PointsConfiguration = [];

  constructor(size: number) {
    if (!Number.isSafeInteger(size) || size < 1) throw new RangeError(`a domain of ${size} points`);
    this.size = size;
    this.description = { kind: "points", size };
  }

  extensions(configuration: PointsConfiguration): readonly PointsConfiguration[] {
    const extended = new Array<PointsConfiguration>(this.size);
    for (let point = 0; point < this.size; point += 1) {
      const longer = configuration.slice();
      longer.push(point);
      extended[point] = longer;
    }
    return extended;
  }

  restrict(configuration: PointsConfiguration, places: readonly number[]): PointsConfiguration {
    return places.map((place) => configuration[place]!);
  }

  same(configuration: PointsConfiguration, first: number, second: number): boolean {
    return configuration[first] === configuration[second];
  }

  kindCount(length: number): number {
    return this.size ** length;
  }

  kindOf(configuration: PointsConfiguration, places: readonly number[]): number {
    let kind = 0;
    for (let i = 0; i < places.length; i += 1) kind = kind * this.size + configuration[places[i]!]!;
    return kind;
  }

  key(configuration: PointsConfiguration): number | string {
    let key = 0;
    for (const point of configuration) key = key * this.size + point;
    return key <= Number.MAX_SAFE_INTEGER ? key : configuration.join();
  }

  mostExtensions(): number {
    return this.size;
  }

  /**
   * The exchanges of two points, of which every permutation is made; on many points those of neighbours only, since
   * the others would cost more than they save.
   */
  symmetries(): readonly Symmetry[] {
    const found: Symmetry[] = [];
    const farthest = this.size <= MANY_POINTS ? this.size : 1;
    for (let first = 0; first < this.size; first += 1)
      for (let second = first + 1; second < Math.min(this.size, first + 1 + farthest); second += 1)
        found.push(new Exchange(this.size, first, second));
    return found;
  }

  /** The tuple of points, counted from 1, that a kind stands for. */
  tupleOf(length: number, kind: number): readonly number[] {
    const tuple: number[] = [];
    for (let rest = kind, place = 0; place < length; place += 1, rest = Math.floor(rest / this.size))
      tuple.unshift((rest % this.size) + 1);
    return tuple;
  }

  /** The kind of a tuple of points counted from 1. */
  kindOfTuple(tuple: readonly number[]): number {
    return tuple.reduce((kind, point) => kind * this.size + (point - 1), 0);
  }
}

class Exchange implements Symmetry {
  readonly #size: number;
  readonly #first: number;
  readonly #second: number;

  constructor(size: number, first: number, second: number) {
    this.#size = size;
    this.#first = first;
    this.#second = second;
  }

  image(length: number, kind: number): number {
    let image = 0;
    let weight = 1;
    for (let rest = kind, place = 0; place < length; place += 1, rest = Math.floor(rest / this.#size)) {
      const point = rest % this.#size;
      const moved = point === this.#first ? this.#second : point === this.#second ? this.#first : point;
      image += moved * weight;
      weight *= this.#size;
    }
    return image;
  }
}
