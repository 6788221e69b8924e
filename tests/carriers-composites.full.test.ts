/** Tuples, sums and products of carriers: more games, types of true elements, and linear arithmetic as a judge. */
import fc from "fast-check";
import { describe, expect, it } from "vitest";
import { buildCarrier } from "../lib/carriers/build.ts";
import type { CarrierDescription, TuplesDescription } from "../lib/logic/structure-definition.ts";
import {
  composites,
  finite,
  integers,
  isTrue,
  nameOf,
  naturals,
  points,
  product,
  R,
  rationals,
  structureOf,
  sum,
  tuples,
} from "./support/carriers-composites.ts";
import {
  checkByLoops,
  checkEquivalent,
  checkGames,
  definitionsOn,
  equivalents,
  sentencesTo,
  typeOfListed,
  typeOfTrue,
} from "./support/carriers-composites-checks.ts";
import { Types } from "./support/carriers-lines.ts";
import { arithmeticOf } from "./support/tuples-arithmetic.ts";
import { startOracle } from "./support/z3.ts";

const seed = Number(process.env.TWOPLACE_SEED ?? 20261201);
const options = (numRuns: number) => ({ seed, numRuns, verbose: 1 as const });
const named = (descriptions: readonly CarrierDescription[]) =>
  descriptions.map((description) => ({ name: nameOf(description), description }));

describe(`more of the same (seed ${seed})`, () => {
  it.each(named(finite))("$name by loops", ({ description }) => {
    checkByLoops(description, options(150));
  });

  it.each(named(composites))("games on $name", ({ description }) => {
    const carrier = buildCarrier(description);
    const isCheap = [0, 1, 2].every((length) => carrier.mostExtensions(length, 3 - length) < 2000);
    checkGames(description, isCheap ? 4 : 3, options(15));
  });

  it.each(
    equivalents.map(([left, right]) => ({ names: `${nameOf(left)} and ${nameOf(right)}`, left, right })),
  )("$names", ({ left, right }) => {
    checkEquivalent(left, right, 3, options(300));
  });

  it("pairs in lexicographic order are copies at each element", () => {
    checkEquivalent(tuples(naturals(), 2), product(naturals(), naturals()), 3, options(8));
  });
});

describe("types", () => {
  it.each([
    ...named([
      tuples(rationals, 2, 1),
      tuples(naturals(), 2),
      tuples(integers(), 2),
      tuples(naturals(1, 1), 1, 0),
      sum(naturals(1, 1), integers(1)),
      product(naturals(), naturals()),
      product(rationals, integers(1)),
      product(points(2), sum(naturals(), points(1))),
      tuples(sum(rationals, points(1)), 2),
    ]).map((one) => ({ ...one, depth: 2 })),
    ...named([
      tuples(rationals, 1, 0),
      tuples(naturals(), 1, 0),
      tuples(rationals, 2),
      sum(naturals(), points(2)),
      sum(naturals(1, 0), integers()),
      product(naturals(), naturals()),
      product(rationals, integers()),
      product(integers(), points(2)),
    ]).map((one) => ({ ...one, depth: 3 })),
  ])("of depth $depth on $name are those of true elements", ({ description, depth }) => {
    const types = new Types();
    const carrier = buildCarrier(description);
    expect(typeOfListed(carrier, carrier.empty, 0, depth, types)).toBe(
      typeOfTrue(carrier, description, [], depth, types),
    );
  });
});

describe("linear arithmetic", () => {
  it.each(
    (
      [
        [tuples(rationals, 1, 0), 3, 60],
        [tuples(rationals, 2), 3, 40],
        [tuples(rationals, 2, 1), 2, 40],
        [tuples(integers(1), 1, 1), 2, 60],
        [tuples(integers(), 2), 2, 40],
        [tuples(naturals(1, 1), 1, 0), 3, 60],
        [tuples(naturals(), 2), 2, 40],
      ] as const
    ).map(([description, depth, count]) => ({ name: nameOf(description), description, depth, count })),
  )(
    `z3-solver agrees on $count sentences to depth $depth on $name (seed ${seed})`,
    async ({ description, depth, count }) => {
      const oracle = await startOracle();
      try {
        let settled = 0;
        let holding = 0;
        const asked = fc.tuple(definitionsOn(description), sentencesTo(depth));
        for (const [formula, said] of fc.sample(asked, { seed, numRuns: count })) {
          const defined = { relation: R, variables: ["x", "y"], formula };
          const problem = arithmeticOf(description as TuplesDescription, defined, said);
          const { mistake, answer } = await oracle.read(problem, { rlimit: 3_000_000 }, true);
          expect(mistake).toBeNull();
          if (answer === 0) continue;
          settled += 1;
          if (answer === 1) holding += 1;
          expect(isTrue(structureOf(description, defined), said), problem).toBe(answer === 1);
        }
        expect(settled).toBeGreaterThan(count * 0.9);
        expect(holding).toBeGreaterThan(count * 0.1);
        expect(holding).toBeLessThan(count * 0.9);
      } finally {
        oracle.close();
      }
    },
  );
});
