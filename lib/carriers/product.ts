import type { ProductDescription } from "../logic/structure-definition.ts";
import type { Carrier } from "./carrier.ts";
import { keyOf, placeInside, placesInside } from "./groups.ts";
import { kindExamplesOf } from "./kind-examples.ts";
import { Listed } from "./listed.ts";

export interface ProductConfiguration {
  /** The copy of each element: copies are numbered from 0 in the order in which they are first met. */
  readonly groups: readonly number[];
  /** Where the copies are: a configuration of the outer carrier, one element for each copy, all different. */
  readonly outer: unknown;
  /** For each copy, the configuration of the inner carrier of the elements in it, in the order of naming. */
  readonly inside: readonly unknown[];
}

/** The kinds that have the same kind of outer components. */
interface KindsOfOuter {
  /** Number of the first of them. */
  readonly start: number;
  /** How many elements are in each copy. */
  readonly elements: readonly number[];
  /** The copy of each element. */
  readonly groups: readonly number[];
}

/**
 * A copy of one carrier, the inner, at every element of another, the outer.
 *
 * Why the extensions suffice: let two tuples be alike for r elements to come when their elements fall into copies in the
 * same way, the places of these copies are alike for r in the outer carrier, and in each copy the elements that are
 * there are alike for r in the inner one. An element in a new copy is answered by the law of the outer carrier in a
 * copy that is new too, since `same` is kept, and there by any answer of the inner carrier to its first element; one in
 * an old copy is answered in the corresponding copy, by the law of the inner carrier. So r moves in the game of Ehrenfeucht
 * and Fraïssé are answered, and the listed extensions represent all (Feferman & Vaught 1959, generalised products).
 *
 * Kinds are numbered by the kind of the outer components, then by the kind in the first copy, in the second, and so on.
 */
export class Product extends Listed<ProductConfiguration> {
  readonly description: ProductDescription;
  override readonly size: number | null;
  readonly empty: ProductConfiguration;
  readonly outer: Carrier;
  readonly inner: Carrier;
  /** By length: by the kind of the outer components; and how many kinds there are in all. */
  readonly #kinds: { readonly byOuter: readonly KindsOfOuter[]; readonly count: number }[] = [];

  constructor(description: ProductDescription, outer: Carrier, inner: Carrier) {
    super();
    this.description = description;
    this.outer = outer;
    this.inner = inner;
    this.size = outer.size === null || inner.size === null ? null : outer.size * inner.size;
    this.empty = { groups: [], outer: outer.empty, inside: [] };
  }

  protected list(configuration: ProductConfiguration, toCome: number): readonly ProductConfiguration[] {
    const { groups, outer, inside } = configuration;
    const copies = inside.length;
    const extended: ProductConfiguration[] = [];
    inside.forEach((there, copy) => {
      const longer = [...groups, copy];
      for (const next of this.inner.extensions(there, toCome))
        extended.push({ groups: longer, outer, inside: inside.with(copy, next) });
    });
    const longer = [...groups, copies];
    const firsts = this.inner.extensions(this.inner.empty, toCome);
    for (const next of this.outer.extensions(outer, toCome)) {
      if (inside.some((_, copy) => this.outer.same(next, copy, copies))) continue;
      for (const first of firsts) extended.push({ groups: longer, outer: next, inside: [...inside, first] });
    }
    return extended;
  }

  restrict({ groups, outer, inside }: ProductConfiguration, places: readonly number[]): ProductConfiguration {
    const copies = [...new Set(places.map((place) => groups[place]!))];
    const chosen = placesInside(groups, places, inside.length);
    return {
      groups: places.map((place) => copies.indexOf(groups[place]!)),
      outer: this.outer.restrict(outer, copies),
      inside: copies.map((copy) => this.inner.restrict(inside[copy], chosen[copy]!)),
    };
  }

  same({ groups, inside }: ProductConfiguration, first: number, second: number): boolean {
    const copy = groups[first]!;
    if (groups[second] !== copy) return false;
    return this.inner.same(inside[copy], placeInside(groups, first), placeInside(groups, second));
  }

  key({ groups, outer, inside }: ProductConfiguration, toCome: number): string {
    return keyOf(groups, [
      this.outer.key(outer, toCome),
      ...inside.map((there) => this.inner.key(there, toCome)),
    ]);
  }

  mostExtensions(named: number, toCome: number): number {
    // New ones in a copy that is new, and in each old copy, of which there are as many as elements at most.
    const inNew = this.outer.mostExtensions(named, toCome) * this.inner.mostExtensions(0, toCome);
    return named === 0 ? inNew : inNew + named * this.inner.mostExtensions(named, toCome);
  }

  override kindCount(length: number): number {
    return this.#kindsOf(length).count;
  }

  protected override findKind(
    { groups, outer, inside }: ProductConfiguration,
    places: readonly number[],
  ): number {
    const kinds = this.#kindsOf(places.length).byOuter;
    const of = places.map((place) => groups[place]!);
    const { start, elements } = kinds[this.outer.kindOf(outer, of)]!;
    const copies = [...new Set(of)];
    const chosen = placesInside(groups, places, inside.length);
    if (copies.length !== elements.length) throw new Error("a kind does not tell what is the same");
    let kind = 0;
    copies.forEach((copy, number) => {
      kind = kind * this.inner.kindCount(elements[number]!) + this.inner.kindOf(inside[copy], chosen[copy]!);
    });
    return start + kind;
  }

  protected kindName(configuration: ProductConfiguration): string {
    return `${this.findKind(configuration, [...configuration.groups.keys()])}`;
  }

  override kindExamples(length: number): readonly ProductConfiguration[] {
    const { byOuter } = this.#kindsOf(length);
    const examples: ProductConfiguration[] = [];
    kindExamplesOf(this.outer, length).forEach((example, kind) => {
      const { elements, groups } = byOuter[kind]!;
      const firsts = elements.map((_, copy) => groups.indexOf(copy));
      const outer = this.outer.restrict(example, firsts);
      const choose = (inside: readonly unknown[]): void => {
        if (inside.length === elements.length) examples.push({ groups, outer, inside });
        else
          for (const there of kindExamplesOf(this.inner, elements[inside.length]!))
            choose([...inside, there]);
      };
      choose([]);
    });
    return examples;
  }

  #kindsOf(length: number): { readonly byOuter: readonly KindsOfOuter[]; readonly count: number } {
    const known = this.#kinds[length];
    if (known !== undefined) return known;
    let count = 0;
    const byOuter = kindExamplesOf(this.outer, length).map((example): KindsOfOuter => {
      const groups: number[] = [];
      const elements: number[] = [];
      for (let place = 0; place < length; place += 1) {
        const twin = groups.findIndex((_, before) => this.outer.same(example, before, place));
        const copy = twin < 0 ? elements.length : groups[twin]!;
        groups.push(copy);
        elements[copy] = (elements[copy] ?? 0) + 1;
      }
      const start = count;
      count += elements.reduce((product, number) => product * this.inner.kindCount(number), 1);
      return { start, elements, groups };
    });
    this.#kinds[length] = { byOuter, count };
    return this.#kinds[length];
  }
}
