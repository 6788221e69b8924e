/** The integer line and the half line with several offsets and ends, each as a carrier and as numbers. */
import fc from "fast-check";
import { HalfLine } from "../../lib/carriers/half-line.ts";
import { type IntegerConfiguration, IntegerLine } from "../../lib/carriers/integer-line.ts";
import type { Listed } from "../../lib/carriers/listed.ts";
import { integers, ListedTypes, naturals, type TrueLine, TrueTypes, Types, whole } from "./carriers-lines.ts";

export interface LineCase {
  readonly name: string;
  readonly carrier: Listed<IntegerConfiguration>;
  readonly line: TrueLine;
  readonly offset: number;
  /** Null on the integer line. */
  readonly ends: number | null;
}

export const integerLine = (offset: number) => new IntegerLine({ kind: "integer-line", offset });
export const halfLine = (offset: number, ends: number) => new HalfLine({ kind: "half-line", offset, ends });

/** A carrier that remembers nothing yet, and its line. */
export function lineCase(offset: number, ends: number | null): LineCase {
  const [name, carrier, line] =
    ends === null
      ? [`integer line, offset ${offset}`, integerLine(offset), integers(offset)]
      : [`half line, offset ${offset}, ends ${ends}`, halfLine(offset, ends), naturals(offset, ends)];
  return { name, carrier, line, offset, ends };
}

/** For the half line, ends that are less than the offset and more. */
export const LINE_CASES = [0, 1, 2].flatMap((offset) =>
  [null, 0, 1, 2, 5].map((ends) => lineCase(offset, ends)),
);

/** Up to so many positions with gaps around those that must be told apart, repeats among them, in any order. */
export function positionsOn(
  { offset, ends }: LineCase,
  most: number,
  depth: number,
): fc.Arbitrary<readonly number[]> {
  const gap = fc.oneof(
    fc.nat(2 * (offset + 1)),
    fc.integer({ min: -2, max: 2 }).map((more) => Math.max(0, 2 ** depth * (offset + 1) + more)),
    fc.nat(3 * 2 ** depth * (offset + 1)),
  );
  const first = fc.oneof(
    gap,
    gap.map((one) => one + (ends ?? 0)),
  );
  return fc
    .tuple(first, fc.array(gap, { minLength: 0, maxLength: most - 1 }))
    .map(([from, gaps]) => {
      const sorted = [from];
      for (const one of gaps) sorted.push(sorted.at(-1)! + one);
      return sorted;
    })
    .chain((sorted) => fc.shuffledSubarray(sorted, { minLength: sorted.length }));
}

/**
 * Walks over pairs of elements, first and gap up to where nothing is told apart any more, and compares the partition by
 * keys with the partition by what formulas of that depth can say.
 * @returns where they differ, and how many classes there are
 */
export function compareKeys({ carrier, line, offset, ends }: LineCase, depth: number) {
  const types = new TrueTypes(line, new Types());
  const reach = 2 ** depth * (offset + 1) + 1;
  const typeOf = new Map<string, number>();
  const keyOf = new Map<number, string>();
  const differences: string[] = [];
  for (const first of ends === null ? [0] : whole(0, ends + reach))
    for (const gap of whole(0, reach + (ends ?? 0))) {
      const positions = [first, first + gap];
      const key = carrier.key({ positions }, depth);
      const type = types.of(positions, depth);
      if ((typeOf.get(key) ?? type) !== type)
        differences.push(`${positions} is unlike others with the key ${key}`);
      if ((keyOf.get(type) ?? key) !== key)
        differences.push(`${positions} is like others without the key ${key}`);
      typeOf.set(key, type);
      keyOf.set(type, key);
    }
  return { differences, classes: typeOf.size };
}

/** Whether the formulas of a depth that are true of positions are those that come out true on what is listed. */
export class Listing {
  readonly #true: TrueTypes;
  readonly #listed: ListedTypes<IntegerConfiguration>;

  constructor({ carrier, line }: LineCase) {
    const types = new Types();
    this.#true = new TrueTypes(line, types);
    this.#listed = new ListedTypes<IntegerConfiguration>(
      carrier,
      ({ positions }) => line.atomic(positions),
      types,
    );
  }

  isTrueTo(depth: number, positions: readonly number[]): boolean {
    return this.#listed.of({ positions }, depth) === this.#true.of(positions, depth);
  }
}
