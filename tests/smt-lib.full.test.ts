/**
 * z3-solver reads what is printed as SMT-LIB, and agrees with the collected claims on what it settles. The claims'
 * outcomes are from exhaustive searches and arguments of their own (tests/data/README.md).
 */
import fc from "fast-check";
import { afterAll, beforeAll, describe, expect, test } from "vitest";
import { printSmtLib } from "../lib/language/smt-lib.ts";
import type { RelationSymbol } from "../lib/logic/formula.ts";
import { claims, readSentences, theoryOf } from "./support/corpora.ts";
import { sentences } from "./support/random-formulas.ts";
import { type Reading, startOracle } from "./support/z3.ts";

const SEED = 20_240_704;
/** A limit on z3's own units of work, so that it ends at the same place each time. */
const WORK = 100_000;

let read: (text: string, asks: boolean) => Promise<Reading>;
let close: () => void = () => {};

beforeAll(async () => {
  const oracle = await startOracle();
  read = (text, asks) => oracle.read(text, { rlimit: WORK }, asks);
  close = oracle.close;
});

afterAll(() => close());

/** Names that SMT-LIB takes for itself, quotes, or has no letters for. */
const relations: readonly RelationSymbol[] = [
  { name: "R", places: 2, infix: false },
  { name: "Between", places: 3, infix: false },
  { name: "distinct", places: 2, infix: false },
  { name: "match", places: 1, infix: false },
  { name: "R1'", places: 2, infix: false },
  { name: "≺", places: 2, infix: true },
  { name: "<=", places: 2, infix: true },
  { name: "U", places: 1, infix: false },
  { name: "Ungefähr", places: 2, infix: false },
];

describe("z3-solver", () => {
  test("sees a mistake where there is one", async () => {
    const text = printSmtLib(theoryOf(readSentences(["forall x. R(x,x)"])), null);
    expect((await read(text, false)).mistake).toBeNull();
    for (const wrong of ["(declare-fun R (U U) Bool)", "(declare-sort U 0)"])
      expect((await read(text.replace(wrong, ""), false)).mistake).not.toBeNull();
  });

  test("reads every axiom of what is printed, whatever it is called", async () => {
    for (const axioms of fc.sample(fc.array(sentences(relations, 3), { maxLength: 4 }), {
      seed: SEED,
      numRuns: 60,
    })) {
      const labels = ["R", "assert", "ite", "mid_2"].slice(0, axioms.length);
      const text = printSmtLib(theoryOf(axioms, labels), null);
      const { mistake, assertions } = await read(text, false);
      expect(mistake, text).toBeNull();
      expect(assertions, text).toBe(axioms.length);
    }
  });

  test("agrees on the collected claims that it settles", async () => {
    const settled = { holds: 0, fails: 0 };
    let asked = 0;
    for (const { id, premises, conclusion, expected } of claims) {
      const [goal, ...axioms] = readSentences([conclusion, ...premises]);
      const text = printSmtLib(theoryOf(axioms), goal!);
      const { mistake, assertions, answer } = await read(text, true);
      expect(mistake, text).toBeNull();
      expect(assertions).toBe(axioms.length + 1);
      asked += 1;
      if (answer === -1) {
        expect(expected, id).toBe("holds");
        settled.holds += 1;
      } else if (answer === 1) {
        expect(expected, id).not.toBe("holds");
        settled.fails += 1;
      }
    }
    expect(settled.holds / asked).toBeGreaterThan(0.3);
    expect(settled.fails).toBeGreaterThan(20);
  });
});
