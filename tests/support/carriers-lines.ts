/**
 * Lines by definition, for tests of the carriers over lines: which formulas of a depth tell true elements apart, by
 * walking over all elements of a window, and the same by walking over what a carrier lists.
 */
import type { Listed } from "../../lib/carriers/listed.ts";

/**
 * A line as numbers. What a carrier says of it must be found again by walking over the numbers themselves, with nothing cut.
 */
export interface TrueLine {
  /** What a table may tell of the elements, from its definition: pair by pair, and element by element. */
  readonly atomic: (positions: readonly number[]) => string;
  /** Elements that stand for all others with so many quantifiers to come after the one that takes them. */
  readonly window: (positions: readonly number[], toCome: number) => readonly number[];
  /** Another tuple of the same line that an automorphism takes this one to; the same for all such. */
  readonly moved: (positions: readonly number[]) => readonly number[];
}

/** A name of what formulas of a depth say of a tuple; the same for two tuples if no such formula tells them apart. */
type Type = number;

/** Numbers types in the order in which they are met, so that those of true and of listed tuples can be compared. */
export class Types {
  readonly #numbers = new Map<string, Type>();

  of(name: string): Type {
    let number = this.#numbers.get(name);
    if (number === undefined) {
      number = this.#numbers.size;
      this.#numbers.set(name, number);
    }
    return number;
  }

  ofAll(parts: Iterable<Type>): Type {
    return this.of([...new Set(parts)].sort((a, b) => a - b).join());
  }
}

/**
 * Types of tuples of true elements (Ehrenfeucht 1961, Fraïssé 1954): of depth 0 what a table tells, of depth r + 1 the set of
 * types of depth r of all tuples with one element more. Two tuples satisfy the same formulas of a depth if and only if
 * their types are the same.
 */
export class TrueTypes {
  readonly #line: TrueLine;
  readonly #types: Types;
  readonly #known: Map<string, Type>[] = [];

  constructor(line: TrueLine, types: Types) {
    this.#line = line;
    this.#types = types;
  }

  of(positions: readonly number[], depth: number): Type {
    const moved = this.#line.moved(positions);
    this.#known[depth] ??= new Map();
    const known = this.#known[depth];
    const key = moved.join();
    let type = known.get(key);
    if (type === undefined) {
      type =
        depth === 0
          ? this.#types.of(this.#line.atomic(moved))
          : this.#types.ofAll(this.extended(moved, depth - 1));
      known.set(key, type);
    }
    return type;
  }

  /** The types, of a depth, of all tuples with one element more. */
  extended(positions: readonly number[], depth: number): readonly Type[] {
    return this.#line.window(positions, depth).map((position) => this.of([...positions, position], depth));
  }
}

/** The same, walking over what a carrier lists. */
export class ListedTypes<Configuration extends object> {
  readonly #carrier: Listed<Configuration>;
  readonly #atomic: (configuration: Configuration) => string;
  readonly #types: Types;

  /** @param atomic what a table may tell of the elements of a configuration, named as on the true line */
  constructor(
    carrier: Listed<Configuration>,
    atomic: (configuration: Configuration) => string,
    types: Types,
  ) {
    this.#carrier = carrier;
    this.#atomic = atomic;
    this.#types = types;
  }

  of(configuration: Configuration, depth: number): Type {
    if (depth === 0) return this.#types.of(this.#atomic(configuration));
    const extensions = this.#carrier.extensions(configuration, depth - 1);
    return this.#types.ofAll(extensions.map((extended) => this.of(extended, depth - 1)));
  }
}

/** The integers, with differences told apart from −offset to offset. */
export function integers(offset: number): TrueLine {
  return {
    atomic: (positions) => differences(positions, offset),
    window: (positions, toCome) =>
      positions.length === 0
        ? [0]
        : whole(
            Math.min(...positions) - beyondAll(offset, toCome),
            Math.max(...positions) + beyondAll(offset, toCome),
          ),
    moved: (positions) => {
      const first = Math.min(...positions);
      return positions.map((position) => position - first);
    },
  };
}

/** The natural numbers, with differences as above and the numbers less than `ends` told apart. */
export function naturals(offset: number, ends: number): TrueLine {
  return {
    atomic: (positions) =>
      `${positions.map((position) => Math.min(position, ends)).join()} ${differences(positions, offset)}`,
    window: (positions, toCome) => whole(0, Math.max(0, ...positions) + ends + beyondAll(offset, toCome)),
    moved: (positions) => positions,
  };
}

/** Three times the distance from which on nothing is told apart, so that one too small by half would be found out. */
function beyondAll(offset: number, toCome: number): number {
  return 3 * 2 ** toCome * (offset + 1);
}

function differences(positions: readonly number[], offset: number): string {
  return positions
    .flatMap((first, i) =>
      positions.slice(i + 1).map((second) => {
        const difference = second - first;
        return Math.abs(difference) <= offset ? difference : difference > 0 ? ">" : "<";
      }),
    )
    .join(" ");
}

/** Denominator of all fractions below; its powers of two are the levels. */
export const FINEST = 1024;

/**
 * The fractions j/1024, as the numbers j, with the colour of j/1024 in lowest terms with the denominator 2^n being n modulo the
 * number of colours: among all fractions j/2^n each colour is dense.
 */
export function dyadics(
  colours: number,
  levels: readonly number[],
): TrueLine & { colourOf(j: number): number } {
  const colourOf = (j: number): number => {
    let level = Math.log2(FINEST);
    for (let rest = j; level > 0 && rest % 2 === 0; rest /= 2) level -= 1;
    return level % colours;
  };
  return {
    colourOf,
    atomic: (positions) =>
      `${positions.map(colourOf).join()} ${positions
        .flatMap((first, i) => positions.slice(i + 1).map((second) => Math.sign(second - first)))
        .join()}`,
    // Each new element is from a finer level and a wider range, so that it has room beside all named before it.
    window: ({ length }) => {
      const step = FINEST / 2 ** levels[length]!;
      return whole((-length * FINEST) / step, ((length + 1) * FINEST) / step).map((k) => k * step);
    },
    moved: (positions) => positions,
  };
}

export function whole(first: number, last: number): number[] {
  return Array.from({ length: last - first + 1 }, (_, index) => first + index);
}
