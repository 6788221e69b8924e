/**
 * The carriers over lines. What they list and how they cut gaps is held against walking over the elements of the lines
 * themselves, with nothing cut (`support/carriers-lines.ts`); truth against z3-solver in linear arithmetic on a small sample
 * (a larger one is in `carriers-lines.full.test.ts`); and numbers of kinds and sentences against what is published.
 *
 * Tried by hand, and found out by these tests: T(1), T(2) or T(3) less by one, T(r) = (r + 1) · (offset + 1), S(1) or S(2) less by one,
 * S(r) = ends + r · (offset + 1), keys of the half line without positions or with the first one's only, extensions of gaps that
 * have not been cut before, one extension less at either end, one colour less in a gap.
 */
import fc from "fast-check";
import { describe, expect, it } from "vitest";
import { type DenseConfiguration, DenseLine } from "../lib/carriers/dense-line.ts";
import {
  compareKeys,
  halfLine,
  integerLine,
  LINE_CASES,
  type LineCase,
  Listing,
  lineCase,
  positionsOn,
} from "./support/carriers-line-cases.ts";
import { dyadics, FINEST, ListedTypes, TrueTypes, Types, whole } from "./support/carriers-lines.ts";

const seed = Number(process.env.TWOPLACE_SEED ?? 20261201);
const options = (numRuns: number) => ({ seed, numRuns, verbose: 1 as const });

const denseLine = (colours: number) => new DenseLine({ kind: "dense-line", colours });

describe.each(LINE_CASES)("$name", (one) => {
  const { carrier, line } = one;

  // The game of Ehrenfeucht 1961 and Fraïssé 1954, played out. Deeper in carriers-lines.full.test.ts.
  it.each(one.offset === 0 ? [0, 1, 2] : [0, 1])(
    "gives two pairs the same key for %i to come just when no formula so deep tells them apart",
    (depth) => {
      const { differences, classes } = compareKeys(one, depth);
      expect(differences).toEqual([]);
      expect(classes).toBeGreaterThan(depth);
    },
  );

  it.each([
    [1, 3, 40],
    [2, 2, 8],
  ])("lists extensions with which formulas of depth %i say what is true", (depth, most, runs) => {
    const listing = new Listing(one);
    fc.assert(
      fc.property(positionsOn(one, most, depth), (positions) => listing.isTrueTo(depth, positions)),
      options(runs),
    );
  });

  it("lists every true extension once, and no other", () => {
    fc.assert(
      fc.property(fc.nat(2), fc.nat(4), fc.infiniteStream(fc.nat(1000)), (toCome, named, numbers) => {
        const [positions] = fc.sample(positionsOn(one, 4, toCome + 1), {
          seed: numbers.next().value,
          numRuns: 1,
        });
        const configuration = named === 0 ? carrier.empty : { positions: positions! };
        const listed = carrier.extensions(configuration, toCome);
        const keys = listed.map((extension) => carrier.key(extension, toCome));
        const found = line
          .window(configuration.positions, toCome)
          .map((position) => carrier.key({ positions: [...configuration.positions, position] }, toCome));
        expect(new Set(keys)).toEqual(new Set(found));
        expect(keys.length).toBe(new Set(keys).size);
        expect(keys.length).toBeLessThanOrEqual(
          carrier.mostExtensions(configuration.positions.length, toCome),
        );
        // The elements named before are what they were.
        for (const extension of listed) {
          const before = carrier.restrict(extension, whole(0, configuration.positions.length - 1));
          expect(carrier.key(before, toCome)).toBe(carrier.key(configuration, toCome));
        }
      }),
      options(60),
    );
  });

  it("numbers the kinds that there are", () => {
    for (const length of [1, 2, 3]) {
      const kindOf = new Map<string, number>();
      const extend = (positions: readonly number[], left: number): void => {
        if (left > 0)
          for (const position of line.window(positions, 0)) extend([...positions, position], left - 1);
        else {
          const atomic = line.atomic(positions);
          const kind = carrier.kindOf({ positions }, whole(0, length - 1));
          expect(kindOf.get(atomic) ?? kind).toBe(kind);
          kindOf.set(atomic, kind);
        }
      };
      if (length < 3 || (one.offset < 2 && (one.ends ?? 0) < 5)) {
        extend([], length);
        expect([...kindOf.values()].sort((a, b) => a - b)).toEqual(whole(0, carrier.kindCount(length) - 1));
      }
    }
  });

  it("keeps what is named when it restricts, in any order and with repeats", () => {
    const restrictions = positionsOn(one, 5, 2).chain((positions) =>
      fc.record({
        positions: fc.constant(positions),
        places: fc.array(fc.nat(positions.length - 1), { minLength: 1, maxLength: 6 }),
        far: fc.nat(50),
        toCome: fc.nat(3),
      }),
    );
    fc.assert(
      fc.property(restrictions, ({ positions, places, far, toCome }) => {
        const configuration = { positions };
        const restricted = carrier.restrict(configuration, places);
        const all = whole(0, places.length - 1);
        if (places.length <= 3)
          expect(carrier.kindOf(restricted, all)).toBe(carrier.kindOf(configuration, places));
        for (const i of all) {
          expect(carrier.kindOf(restricted, [i])).toBe(carrier.kindOf(configuration, [places[i]!]));
          for (const j of all) {
            expect(carrier.same(restricted, i, j)).toBe(positions[places[i]!] === positions[places[j]!]);
            expect(carrier.kindOf(restricted, [i, j])).toBe(
              carrier.kindOf(configuration, [places[i]!, places[j]!]),
            );
          }
        }
        const twice = carrier.restrict(restricted, [...all].reverse());
        expect(carrier.key(twice, toCome)).toBe(
          carrier.key(carrier.restrict(configuration, [...places].reverse()), toCome),
        );
        // Another configuration with the same key: one with greater gaps where they are great.
        const stretched = { positions: stretch(one, positions, far, toCome) };
        expect(carrier.key(stretched, toCome)).toBe(carrier.key(configuration, toCome));
        expect(carrier.key(carrier.restrict(stretched, places), toCome)).toBe(
          carrier.key(restricted, toCome),
        );
        if (toCome > 0)
          expect(lineCase(one.offset, one.ends).carrier.extensions(stretched, toCome - 1)).toEqual(
            lineCase(one.offset, one.ends).carrier.extensions(configuration, toCome - 1),
          );
      }),
      options(150),
    );
  });

  it("lists the same in the same order whatever it was asked before", () => {
    const again = lineCase(one.offset, one.ends).carrier;
    const configurations = fc.sample(positionsOn(one, 3, 2), { seed, numRuns: 40 });
    const before = configurations.map((positions) => carrier.extensions({ positions }, 1));
    const after = [...configurations].reverse().map((positions) => again.extensions({ positions }, 1));
    expect(after.reverse()).toEqual(before);
    expect(again.kindExamples(2)).toEqual(carrier.kindExamples(2));
  });
});

/** Moves elements with a gap of T(toCome) or more before them further up, as far as positions allow. */
function stretch(
  { offset, ends }: LineCase,
  positions: readonly number[],
  far: number,
  toCome: number,
): number[] {
  const gap = 2 ** toCome * (offset + 1);
  const told = ends === null ? Number.NEGATIVE_INFINITY : ends + gap - (offset + 1);
  const sorted = [...new Set(positions)].sort((a, b) => a - b);
  const moved = new Map<number, number>();
  sorted.forEach((position, i) => {
    const free = i === 0 || position - sorted[i - 1]! >= gap;
    const shift = i === 0 ? 0 : moved.get(sorted[i - 1]!)! - sorted[i - 1]!;
    moved.set(position, position + (position < told ? 0 : shift + (free ? far : 0)));
  });
  return positions.map((position) => moved.get(position)!);
}

describe.each([1, 2, 3])("dense line in %i colours", (colours) => {
  const line = dyadics(colours, []);
  const carrier = denseLine(colours);
  const first = FINEST / 2 ** 3;

  /** Whole numbers of eighths, in any order. */
  const named = (most: number) =>
    fc
      .array(fc.integer({ min: -4, max: 12 }), { maxLength: most })
      .map((eighths) => eighths.map((k) => k * first));

  const configurationOf = (positions: readonly number[]): DenseConfiguration => {
    const sorted = [...new Set(positions)].sort((a, b) => a - b);
    return {
      ranks: positions.map((position) => sorted.indexOf(position)),
      colours: positions.map(line.colourOf),
    };
  };

  it("lists every extension among the fractions once, and no other", () => {
    fc.assert(
      fc.property(named(3), (positions) => {
        const configuration = configurationOf(positions);
        const finest = whole(-FINEST, 2 * FINEST);
        const found = new Set(
          finest.map((position) => carrier.key(configurationOf([...positions, position]))),
        );
        const listed = carrier.extensions(configuration, 0).map((extension) => carrier.key(extension));
        expect(new Set(listed)).toEqual(found);
        expect(listed.length).toBe(found.size);
        expect(listed.length).toBeLessThanOrEqual(carrier.mostExtensions(positions.length));
      }),
      options(60),
    );
  });

  it("lists extensions with which formulas of depth 2 say what is true", () => {
    const types = new Types();
    const trueTypes = new TrueTypes(dyadics(colours, [2, 2 + colours, 2 + 2 * colours]), types);
    const atomic = ({ ranks, colours: told }: DenseConfiguration) =>
      `${told.join()} ${ranks.flatMap((a, i) => ranks.slice(i + 1).map((b) => Math.sign(b - a))).join()}`;
    const listedTypes = new ListedTypes(carrier, atomic, types);
    for (const quarter of [0, 1, 2, 3]) {
      const positions = [(quarter * FINEST) / 4];
      expect(listedTypes.of(configurationOf(positions), 2)).toBe(trueTypes.of(positions, 2));
    }
  });

  it("keeps what is named when it restricts, in any order and with repeats", () => {
    const restrictions = named(5).chain((positions) =>
      fc.record({
        positions: fc.constant(positions),
        places: fc.array(fc.nat(Math.max(0, positions.length - 1)), {
          maxLength: positions.length === 0 ? 0 : 5,
        }),
      }),
    );
    fc.assert(
      fc.property(restrictions, ({ positions, places }) => {
        const configuration = configurationOf(positions);
        const restricted = carrier.restrict(configuration, places);
        expect(restricted).toEqual(configurationOf(places.map((place) => positions[place]!)));
        const all = whole(0, places.length - 1);
        if (places.length <= 4)
          expect(carrier.kindOf(restricted, all)).toBe(carrier.kindOf(configuration, places));
        for (const i of all)
          for (const j of all)
            expect(carrier.same(restricted, i, j)).toBe(positions[places[i]!] === positions[places[j]!]);
      }),
      options(200),
    );
  });

  it("lists the same in the same order whatever it was asked before", () => {
    const again = denseLine(colours);
    again.kindCount(3);
    const configurations = fc.sample(named(3), { seed, numRuns: 40 }).map(configurationOf);
    const before = configurations.map((configuration) => carrier.extensions(configuration, 0));
    const after = [...configurations].reverse().map((configuration) => again.extensions(configuration, 2));
    expect(after.reverse()).toEqual(before);
    expect(again.kindExamples(3)).toEqual(carrier.kindExamples(3));
  });
});

describe("numbers of kinds", () => {
  /** Ways to sort n elements into k classes, from k · S(n − 1, k) + S(n − 1, k − 1). */
  const stirling = (n: number, k: number): number =>
    k === 0 || k > n ? Number(n === 0 && k === 0) : k * stirling(n - 1, k) + stirling(n - 1, k - 1);
  const factorial = (k: number): number => (k === 0 ? 1 : k * factorial(k - 1));
  const classes = (n: number, waysOf: (k: number) => number) =>
    whole(1, n).reduce((sum, k) => sum + factorial(k) * stirling(n, k) * waysOf(k), 0);

  it("are those of weak orders on the dense line, OEIS A000670", () => {
    const carrier = denseLine(1);
    expect([1, 2, 3, 4, 5].map((n) => carrier.kindCount(n))).toEqual([1, 3, 13, 75, 541]);
  });

  it("are those of weak orders with coloured classes, in two colours OEIS A004123", () => {
    const carrier = denseLine(2);
    expect([1, 2, 3, 4].map((n) => carrier.kindCount(n))).toEqual([2, 10, 74, 730]);
    for (const n of [1, 2, 3]) expect(denseLine(3).kindCount(n)).toBe(classes(n, (k) => 3 ** k));
  });

  it("are those of weak orders with one of offset + 1 gaps between classes on the integer line", () => {
    for (const offset of [0, 1, 2])
      for (const n of [1, 2, 3])
        expect(integerLine(offset).kindCount(n)).toBe(classes(n, (k) => (offset + 1) ** (k - 1)));
    // The same on a half line whose end is not told.
    for (const offset of [0, 1, 2])
      for (const n of [1, 2, 3])
        expect(halfLine(offset, 0).kindCount(n)).toBe(integerLine(offset).kindCount(n));
  });

  // Ehrenfeucht 1961: with r quantifiers, 2^r − 1 elements in between cannot be told from more.
  it("grow with what is to come as the theory of linear orders says", () => {
    for (const toCome of [0, 1, 2, 3]) {
      const gaps = whole(1, 40).map((gap) => integerLine(0).key({ positions: [0, gap] }, toCome));
      expect(new Set(gaps).size).toBe(2 ** toCome);
      expect(gaps.indexOf(gaps.at(-1)!)).toBe(2 ** toCome - 1);
    }
  });
});

describe("bounds on extensions", () => {
  it("are infinite where numbers are no longer exact, and finite elsewhere", () => {
    expect(integerLine(1000).mostExtensions(1, 60)).toBe(Number.POSITIVE_INFINITY);
    expect(halfLine(1000, 1000).mostExtensions(0, 60)).toBe(Number.POSITIVE_INFINITY);
    expect(halfLine(0, 0).mostExtensions(3, 2000)).toBe(Number.POSITIVE_INFINITY);
    expect(integerLine(0).mostExtensions(0, 60)).toBe(1);
    expect(integerLine(1000).mostExtensions(1, 0)).toBe(2003);
    expect(halfLine(0, 1000).mostExtensions(0, 0)).toBe(1001);
  });

  it("are met by a configuration whose gaps are all great", () => {
    const positions = [5000, 9000, 1000];
    for (const toCome of [0, 1, 2, 3])
      for (const carrier of [integerLine(2), halfLine(2, 3)]) {
        const configuration = { positions };
        expect(carrier.extensions(configuration, toCome).length).toBe(carrier.mostExtensions(3, toCome));
      }
  });
});
