import type { BooleanAlgebraDescription } from "../logic/structure-definition.ts";
import type { Symmetry } from "./carrier.ts";
import { KindSymmetry } from "./kind-symmetry.ts";
import { Listed } from "./listed.ts";

/** Elements up to which the nonempty cells of a configuration fit into the bits of a short number. */
const FEW = 4;

export interface BooleanConfiguration {
  readonly named: number;
  /**
   * The cells that are not empty, ascending. The cell m is what lies in the elements at all places i where bit i of m is
   * set, and outside of all others; cell 0 is the outer cell, outside of all of them.
   */
  readonly cells: readonly number[];
  /** A name of the cells. */
  readonly name: string;
}

/**
 * The countable Boolean algebra without atoms (Koppelberg 1989), with zero and top; the same without its zero; or the
 * elements other than zero of the countable distributive lattice with zero that is relatively complemented, has no
 * atoms, and has a larger element for each element. To have them before one's eyes: the finite unions of intervals
 * [a, b) with rational ends, within [0, 1), or for the last anywhere on the line.
 *
 * Elements x₁ … xₙ cut the whole into 2ⁿ cells; a configuration says which of them are not empty. By that it is known
 * which of two comes to more, of all that is made of x₁ … xₙ by meets, joins and complements.
 *
 * Why the extensions suffice: let two tuples x and y have the same nonempty cells, and let a be any element. Of each
 * nonempty cell of x it contains nothing, all, or a proper part. From the cell of y with the same number take nothing,
 * all, or a proper part, which exists as the cell is no atom, and let b be the join of what was taken. Then x, a and y, b
 * have the same nonempty cells. So tuples with the same configuration can be extended to such for ever, in both
 * directions, and satisfy the same formulas (Fraïssé 1954). What can be taken is exactly what is listed:
 * - Without zero, a takes something from some cell, and then so does b.
 * - Without top, let u be the join of x₁ … xₙ (zero, when n = 0). The outer cell, all outside of u, is no element, nor
 *   is it contained in one: the join of u and that element would have no larger one. So it is not taken whole. A part
 *   of it is an element outside of u; there is one that is not zero, as u has a larger element. So it is never empty.
 * - Other cells are elements, or zero.
 *
 * It does not matter how many quantifiers are still to come. The same argument, with x in one algebra and y in another,
 * shows that each of the three is unique up to isomorphism (Koppelberg 1989, for the first).
 */
export class BooleanAlgebra extends Listed<BooleanConfiguration> {
  readonly description: BooleanAlgebraDescription;
  readonly empty: BooleanConfiguration = configurationOf(0, [0]);
  /** By length: the kind of the tuples with some nonempty cells, by the number that has the bits of these cells set. */
  readonly #kinds: (readonly number[])[] = [];
  /** Configurations of few elements, by number of elements and the number that has the bits of their cells set. */
  readonly #few: Map<number, BooleanConfiguration>[] = [];

  /** @throws RangeError for a zero without a top */
  constructor(description: BooleanAlgebraDescription) {
    super();
    if (description.zero && !description.top)
      throw new RangeError("a Boolean algebra with its zero and without its top");
    this.description = description;
  }

  protected list({ named, cells }: BooleanConfiguration): readonly BooleanConfiguration[] {
    const { zero, top } = this.description;
    const extended: BooleanConfiguration[] = [];
    const bit = 2 ** named;
    const outside: number[] = [];
    const inside: number[] = [];
    const choose = (place: number): void => {
      if (place === cells.length) {
        if (zero || inside.length > 0) extended.push(configurationOf(named + 1, outside.concat(inside)));
        return;
      }
      const cell = cells[place]!;
      outside.push(cell);
      choose(place + 1);
      outside.pop();
      inside.push(cell + bit);
      if (top || cell !== 0) choose(place + 1);
      outside.push(cell);
      choose(place + 1);
      outside.pop();
      inside.pop();
    };
    choose(0);
    return extended;
  }

  restrict({ cells }: BooleanConfiguration, places: readonly number[]): BooleanConfiguration {
    const named = places.length;
    if (named > FEW) {
      const merged = new Set(cells.map((cell) => cellAt(cell, places)));
      return configurationOf(
        named,
        [...merged].sort((a, b) => a - b),
      );
    }
    this.#few[named] ??= new Map();
    const bits = bitsAt(cells, places);
    let configuration = this.#few[named].get(bits);
    if (configuration === undefined) {
      const merged: number[] = [];
      for (let cell = 0; cell < 2 ** named; cell += 1) if ((bits >>> cell) & 1) merged.push(cell);
      configuration = configurationOf(named, merged);
      this.#few[named].set(bits, configuration);
    }
    return configuration;
  }

  same({ cells }: BooleanConfiguration, first: number, second: number): boolean {
    return cells.every((cell) => ((cell >>> first) & 1) === ((cell >>> second) & 1));
  }

  override kindOf(configuration: BooleanConfiguration, places: readonly number[]): number {
    if (places.length > FEW) return super.kindOf(configuration, places);
    this.#kinds[places.length] ??= this.#listKinds(places.length);
    return this.#kinds[places.length]![bitsAt(configuration.cells, places)]!;
  }

  protected kindName({ name }: BooleanConfiguration): string {
    return name;
  }

  key({ name }: BooleanConfiguration): string {
    return name;
  }

  /** Three for each cell, less what is forbidden without a zero or a top. */
  mostExtensions(named: number): number {
    const { zero, top } = this.description;
    const cells = 2 ** named;
    const most = (top ? 3 ** cells : 2 * 3 ** (cells - 1)) - (zero ? 0 : 1);
    return most <= Number.MAX_SAFE_INTEGER ? most : Number.POSITIVE_INFINITY;
  }

  /**
   * Complements, where there are zero and top. And an exchange of zero and top that leaves all other elements where they
   * are: automorphisms leave both where they are, so that it takes tuples of one kind to tuples of one kind. Where only
   * the top is there, complements of all elements but that.
   */
  override symmetries(): readonly Symmetry[] {
    const { zero, top } = this.description;
    if (!top) return [];
    const symmetry = (complemented: (isExtreme: boolean) => boolean) =>
      new KindSymmetry<BooleanConfiguration>(this, ({ named, cells }) => {
        let changed = 0;
        for (let place = 0; place < named; place += 1) {
          const inside = cells.filter((cell) => (cell >>> place) & 1).length;
          if (complemented(inside === 0 || inside === cells.length)) changed += 2 ** place;
        }
        return configurationOf(
          named,
          cells.map((cell) => cell ^ changed).sort((a, b) => a - b),
        );
      });
    const others = symmetry((isExtreme) => !isExtreme);
    return zero ? [symmetry(() => true), symmetry((isExtreme) => isExtreme), others] : [others];
  }

  #listKinds(length: number): readonly number[] {
    const places = Array.from({ length }, (_, place) => place);
    const kinds: number[] = [];
    for (const [kind, { cells }] of this.kindExamples(length).entries()) kinds[bitsAt(cells, places)] = kind;
    return kinds;
  }
}

/** @param cells ascending */
function configurationOf(named: number, cells: readonly number[]): BooleanConfiguration {
  if (named > FEW) return { named, cells, name: `${named}:${cells.join()}` };
  let bits = 0;
  for (let place = 0; place < cells.length; place += 1) bits |= 1 << cells[place]!;
  return { named, cells, name: String.fromCharCode(named, bits) };
}

/** The cell, among those of the elements at some places, in which a cell lies. */
function cellAt(cell: number, places: readonly number[]): number {
  let smaller = 0;
  for (let place = 0; place < places.length; place += 1) smaller |= ((cell >>> places[place]!) & 1) << place;
  return smaller;
}

/** The number that has the bits of the nonempty cells of the elements at some few places set. */
function bitsAt(cells: readonly number[], places: readonly number[]): number {
  let bits = 0;
  for (let at = 0; at < cells.length; at += 1) bits |= 1 << cellAt(cells[at]!, places);
  return bits;
}
