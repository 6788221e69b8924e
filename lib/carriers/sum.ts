import type { SumDescription } from "../logic/structure-definition.ts";
import type { Carrier, Symmetry } from "./carrier.ts";
import { exchanged, keyOf, pairsWithSame, placeInside, placesInside } from "./groups.ts";
import { kindExamplesOf } from "./kind-examples.ts";
import { KindSymmetry } from "./kind-symmetry.ts";
import { Listed } from "./listed.ts";

export interface SumConfiguration {
  /** The part of each element. */
  readonly parts: readonly number[];
  /** For each part, the configuration there of the elements that are in it, in the order of naming. */
  readonly inside: readonly unknown[];
}

/**
 * The elements of several carriers side by side.
 *
 * Why the extensions suffice: let two tuples be alike for r elements to come when their elements are in the same parts
 * and in each part those that are there are alike for r. An element that is added to one is answered in the same part,
 * by the law of that part; the other parts are alike for r − 1 since they were for r. So r moves in the game of
 * Ehrenfeucht and Fraïssé are answered, and the listed extensions represent all (Feferman & Vaught 1959).
 *
 * Kinds are numbered by the parts of the elements in lexicographic order, then by the kind in the first part, in the
 * second, and so on.
 */
export class Sum extends Listed<SumConfiguration> {
  readonly description: SumDescription;
  override readonly size: number | null;
  readonly empty: SumConfiguration;
  /** What the elements are elements of. */
  readonly parts: readonly Carrier[];
  /** By how many elements are in each part and how many are still to be assigned one: how many kinds there are. */
  readonly #counts = new Map<string, number>();

  constructor(description: SumDescription, parts: readonly Carrier[]) {
    super();
    this.description = description;
    this.parts = parts;
    this.size = parts.reduce<number | null>(
      (sum, { size }) => (sum === null || size === null ? null : sum + size),
      0,
    );
    this.empty = { parts: [], inside: parts.map(({ empty }) => empty) };
  }

  protected list(configuration: SumConfiguration, toCome: number): readonly SumConfiguration[] {
    return this.parts.flatMap((carrier, part) => {
      const parts = [...configuration.parts, part];
      return carrier
        .extensions(configuration.inside[part], toCome)
        .map((extended) => ({ parts, inside: configuration.inside.with(part, extended) }));
    });
  }

  restrict({ parts, inside }: SumConfiguration, places: readonly number[]): SumConfiguration {
    const chosen = placesInside(parts, places, this.parts.length);
    return {
      parts: places.map((place) => parts[place]!),
      inside: this.parts.map((carrier, part) => carrier.restrict(inside[part], chosen[part]!)),
    };
  }

  same({ parts, inside }: SumConfiguration, first: number, second: number): boolean {
    const part = parts[first]!;
    if (parts[second] !== part) return false;
    return this.parts[part]!.same(inside[part], placeInside(parts, first), placeInside(parts, second));
  }

  key({ parts, inside }: SumConfiguration, toCome: number): string {
    return keyOf(
      parts,
      this.parts.map((carrier, part) => carrier.key(inside[part], toCome)),
    );
  }

  mostExtensions(named: number, toCome: number): number {
    return this.parts.reduce((sum, carrier) => sum + carrier.mostExtensions(named, toCome), 0);
  }

  override kindCount(length: number): number {
    return this.#count(
      length,
      this.parts.map(() => 0),
    );
  }

  protected override findKind({ parts, inside }: SumConfiguration, places: readonly number[]): number {
    let before = 0;
    let elements: readonly number[] = this.parts.map(() => 0);
    places.forEach((place, index) => {
      const part = parts[place]!;
      for (let lesser = 0; lesser < part; lesser += 1)
        before += this.#count(places.length - 1 - index, oneMore(elements, lesser));
      elements = oneMore(elements, part);
    });
    const chosen = placesInside(parts, places, this.parts.length);
    let kind = 0;
    for (const [part, carrier] of this.parts.entries())
      kind = kind * carrier.kindCount(elements[part]!) + carrier.kindOf(inside[part], chosen[part]!);
    return before + kind;
  }

  protected kindName(configuration: SumConfiguration): string {
    return `${this.findKind(configuration, [...configuration.parts.keys()])}`;
  }

  override kindExamples(length: number): readonly SumConfiguration[] {
    const examples: SumConfiguration[] = [];
    const choose = (parts: readonly number[], inside: readonly unknown[]): void => {
      if (inside.length === this.parts.length) examples.push({ parts, inside });
      else {
        const elements = parts.filter((part) => part === inside.length).length;
        for (const example of kindExamplesOf(this.parts[inside.length]!, elements))
          choose(parts, [...inside, example]);
      }
    };
    const extend = (parts: readonly number[]): void => {
      if (parts.length < length) for (const part of this.parts.keys()) extend([...parts, part]);
      else choose(parts, []);
    };
    extend([]);
    return examples;
  }

  /** The exchanges of two parts with the same description. */
  override symmetries(): readonly Symmetry[] {
    const descriptions = this.parts.map(({ description }) => JSON.stringify(description));
    return pairsWithSame(descriptions).map(
      ([first, second]) =>
        new KindSymmetry<SumConfiguration>(this, ({ parts, inside }) => ({
          parts: parts.map((part) => exchanged(part, first, second)),
          inside: inside.with(first, inside[second]).with(second, inside[first]),
        })),
    );
  }

  /** How many kinds there are of tuples that go on for so many elements, when so many before are in each part. */
  #count(toCome: number, elements: readonly number[]): number {
    const name = `${toCome};${elements.join()}`;
    let count = this.#counts.get(name);
    if (count === undefined) {
      if (toCome === 0)
        count = this.parts.reduce(
          (product, carrier, part) => product * carrier.kindCount(elements[part]!),
          1,
        );
      else {
        count = 0;
        for (const part of this.parts.keys()) count += this.#count(toCome - 1, oneMore(elements, part));
      }
      this.#counts.set(name, count);
    }
    return count;
  }
}

function oneMore(elements: readonly number[], part: number): readonly number[] {
  return elements.with(part, elements[part]! + 1);
}
