/**
 * The carriers over lines against z3-solver, which decides quantified linear arithmetic over the rationals and the integers,
 * on random sentences about random defined relations; and deeper walks over the elements than in `carriers-lines.test.ts`.
 */
import fc from "fast-check";
import { afterAll, beforeAll, describe, expect, it } from "vitest";
import { compareMany } from "./support/carriers-arithmetic.ts";
import { compareKeys, LINE_CASES, Listing, lineCase, positionsOn } from "./support/carriers-line-cases.ts";
import { type Oracle, startOracle } from "./support/z3.ts";

const seed = Number(process.env.TWOPLACE_SEED ?? 20261201);
const options = (numRuns: number) => ({ seed, numRuns, verbose: 1 as const });

describe("z3-solver in linear arithmetic", () => {
  let oracle: Oracle;
  beforeAll(async () => {
    oracle = await startOracle();
  });
  afterAll(() => oracle.close());

  it("agrees with both evaluators on 900 sentences of depth 1 to 4", async () => {
    const { wrong, spread } = await compareMany([30, 60, 90, 120], seed, oracle);
    expect(wrong, `seed ${seed}`).toEqual([]);
    expect(spread.true + spread.false + spread.unknown).toBe(900);
    expect(spread.unknown).toBeLessThanOrEqual(9);
    expect(Math.min(spread.true, spread.false)).toBeGreaterThan(270);
  });
});

describe("formulas of depth 2 and 3", () => {
  it.each(LINE_CASES.filter(({ offset }) => offset > 0))(
    "on the $name: pairs by keys with 2 to come",
    (one) => {
      const { differences, classes } = compareKeys(one, 2);
      expect(differences).toEqual([]);
      expect(classes).toBeGreaterThan(2 ** 2 * (one.offset + 1));
    },
  );

  it.each([lineCase(0, null), lineCase(0, 1)])("on the $name: pairs by keys with 3 to come", (one) => {
    const { differences, classes } = compareKeys(one, 3);
    expect(differences).toEqual([]);
    expect(classes).toBeGreaterThan(2 ** 3);
  });

  it.each(LINE_CASES)("on the $name: three elements by listing, to depth 2", (one) => {
    const listing = new Listing(one);
    fc.assert(
      fc.property(positionsOn(one, 3, 2), (positions) => listing.isTrueTo(2, positions)),
      options(30),
    );
  });

  it.each([lineCase(0, null), lineCase(0, 0), lineCase(0, 1), lineCase(1, null)])(
    "on the $name: up to two elements by listing, to depth 3",
    (one) => {
      const listing = new Listing(one);
      fc.assert(
        fc.property(positionsOn(one, 2, 3), (positions) => listing.isTrueTo(3, positions)),
        options(5),
      );
      expect(listing.isTrueTo(3, [])).toBe(true);
    },
  );
});
