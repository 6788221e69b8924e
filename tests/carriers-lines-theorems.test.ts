/**
 * Published sentences about the rationals, the integers and the natural numbers, on the carriers over lines: axioms of their
 * orders and of the successor, and what separates them. Both evaluators are asked; and z3-solver on a small sample of random
 * sentences (a larger one is in `carriers-lines.full.test.ts`).
 */
import { afterAll, beforeAll, describe, expect, it } from "vitest";
import { DenseLine } from "../lib/carriers/dense-line.ts";
import type { Structure } from "../lib/carriers/structure.ts";
import { recordStructure } from "../lib/carriers/structure-record.ts";
import { denseLineVocabulary } from "../lib/carriers/vocabulary/lines.ts";
import { isTrueIn } from "../lib/evidence/evaluate.ts";
import { and, atom, exists, type Formula, forall, implies, not } from "../lib/logic/formula.ts";
import { Meter } from "../lib/logic/meter.ts";
import { recordFormula } from "../lib/logic/records/formulas.ts";
import type { CarrierFormula, ElementTerm } from "../lib/logic/structure-definition.ts";
import { satisfies } from "../lib/structures/evaluate.ts";
import {
  compareMany,
  type Definition,
  fill,
  type Line,
  P,
  R,
  S,
  structureOf,
} from "./support/carriers-arithmetic.ts";
import { whole } from "./support/carriers-lines.ts";
import { readSentences } from "./support/corpora.ts";
import { type Oracle, startOracle } from "./support/z3.ts";

const seed = Number(process.env.TWOPLACE_SEED ?? 20261201);

const [x, y] = ["x", "y"].map((variable): ElementTerm => ({ kind: "element", variable, path: [] })) as [
  ElementTerm,
  ElementTerm,
];
const less: CarrierFormula = { kind: "compare", relation: "<", left: x, right: y };
const steps = (by: number): CarrierFormula => ({
  kind: "compare",
  relation: "=",
  left: { kind: "shift", of: x, by },
  right: y,
});
const isNumber = (value: number): CarrierFormula => ({
  kind: "compare",
  relation: "=",
  left: x,
  right: { kind: "number", value },
});
const order: Definition = { relation: R, variables: ["x", "y"], formula: less };
const step = (by: number): Definition => ({ relation: S, variables: ["x", "y"], formula: steps(by) });
const at = (value: number): Definition => ({ relation: P, variables: ["x"], formula: isNumber(value) });

const structureOn = (line: Line, ...definitions: Definition[]) =>
  structureOf({ line, definitions, sentence: { kind: "true" } });

function truth(structure: Structure, sentence: Formula): boolean {
  const searched = satisfies(structure, sentence, new Meter());
  expect(isTrueIn(recordStructure(structure), recordFormula(sentence), new Meter())).toBe(searched);
  return searched;
}

describe("orders", () => {
  const lines = {
    rationals: structureOn("rationals", order),
    integers: structureOn("integers", order),
    naturals: structureOn("naturals", order),
  };
  const everywhere = ["rationals", "integers", "naturals"];

  it.each<[string, string, readonly string[]]>([
    // A linear order without a last element.
    ["is irreflexive", "forall x. ~R(x,x)", everywhere],
    ["is transitive", "forall x y z. R(x,y) & R(y,z) -> R(x,z)", everywhere],
    ["is total", "forall x y. R(x,y) | x = y | R(y,x)", everywhere],
    ["has no last element", "forall x. exists y. R(x,y)", everywhere],
    // Cantor 1895: with the four above and this, the order of the rationals.
    ["has no first element", "forall x. exists y. R(y,x)", ["rationals", "integers"]],
    ["is dense", "forall x y. R(x,y) -> exists z. R(x,z) & R(z,y)", ["rationals"]],
    // Langford 1926: the discrete orders of the integers and of the natural numbers.
    [
      "has next elements",
      "forall x. exists y. R(x,y) & ~exists z. R(x,z) & R(z,y)",
      ["integers", "naturals"],
    ],
    ["has elements just before", "forall x. exists y. R(y,x) & ~exists z. R(y,z) & R(z,x)", ["integers"]],
    [
      "has elements just before all but a first",
      "forall x. (exists y. R(y,x)) -> exists y. R(y,x) & ~exists z. R(y,z) & R(z,x)",
      ["integers", "naturals"],
    ],
    ["has one first element", "exists x. forall y. x = y | R(x,y)", ["naturals"]],
    // The order of the natural numbers is not that of ω + 1, which has a last element, nor of ω + ω, which has a second one
    // without a next one before it.
    [
      "has two elements without one just before",
      "exists x y. R(x,y) & (~exists z. R(z,x) & ~exists t. R(z,t) & R(t,x)) & ~exists z. R(z,y) & ~exists t. R(z,t) & R(t,y)",
      ["rationals"],
    ],
  ])("%s", (_, text, where) => {
    const [sentence] = readSentences([text]);
    for (const [name, structure] of Object.entries(lines))
      expect(truth(structure, sentence!), name).toBe(where.includes(name));
  });

  // Skolem 1920: the rationals in two dense colours.
  it("has both colours between any two elements, and past each, on a coloured line", () => {
    const carrier = new DenseLine({ kind: "dense-line", colours: 2 });
    const colour: CarrierFormula = { kind: "label", name: "colour", of: x, value: 1 };
    const structure = fill(carrier, denseLineVocabulary(carrier), [
      order,
      { relation: P, variables: ["x"], formula: colour },
    ]);
    const between = and(atom(R, "x", "z"), atom(R, "z", "y"));
    for (const side of [atom(P, "z"), not(atom(P, "z"))]) {
      expect(
        truth(structure, forall(["x", "y"], implies(atom(R, "x", "y"), exists("z", and(between, side))))),
      ).toBe(true);
      expect(truth(structure, forall("x", exists("z", and(atom(R, "x", "z"), side))))).toBe(true);
      expect(truth(structure, forall("x", exists("z", and(atom(R, "z", "x"), side))))).toBe(true);
      expect(truth(structure, exists("x", forall("z", implies(atom(R, "x", "z"), side))))).toBe(false);
    }
  });
});

describe("successors", () => {
  // The axioms of the successor (Enderton 2001, section 3.1): one to one, not onto, all but one element reached.
  it.each<[string, string, boolean, boolean]>([
    ["is total", "forall x. exists y. R(x,y)", true, true],
    ["is a function", "forall x y z. R(x,y) & R(x,z) -> y = z", true, true],
    ["is one to one", "forall x y z. R(x,z) & R(y,z) -> x = y", true, true],
    ["is onto", "forall y. exists x. R(x,y)", true, false],
    ["has one element that is no value", "exists x. forall y. ~R(y,x)", false, true],
    [
      "has two elements that are no values",
      "exists x y. x != y & (forall z. ~R(z,x)) & forall z. ~R(z,y)",
      false,
      false,
    ],
    ["has no cycles of three", "forall x y z. ~(R(x,y) & R(y,z) & R(z,x))", true, true],
  ])("%s", (_, text, onIntegers, onNaturals) => {
    const [sentence] = readSentences([text]);
    const successor: Definition = { relation: R, variables: ["x", "y"], formula: steps(1) };
    expect(truth(structureOn("integers", successor), sentence!)).toBe(onIntegers);
    expect(truth(structureOn("naturals", successor), sentence!)).toBe(onNaturals);
  });

  it("by two, misses two natural numbers and not three", () => {
    const structure = structureOn("naturals", { relation: R, variables: ["x", "y"], formula: steps(2) });
    const misses = readSentences([
      "exists x y. x != y & (forall z. ~R(z,x)) & forall z. ~R(z,y)",
      "exists x y z. x != y & y != z & x != z & (forall t. ~R(t,x)) & (forall t. ~R(t,y)) & forall t. ~R(t,z)",
    ]);
    expect(misses.map((sentence) => truth(structure, sentence))).toEqual([true, false]);
  });
});

// By halving, a distance of at least n takes ⌈log₂ n⌉ quantifiers (common practice); each number is then told from the next
// just when it must be.
describe("distances by halving", () => {
  const apart = (n: number, from: string, to: string, depth = 0): Formula => {
    if (n === 1) return atom(R, from, to);
    const between = `z${depth}`;
    const half = Math.floor(n / 2);
    return exists(
      between,
      and(apart(half, from, between, depth + 1), apart(n - half, between, to, depth + 1)),
    );
  };
  /** Whether at least n numbers are less. */
  const farFromEnd = (n: number, element: string, depth = 0): Formula => {
    if (n === 0) return { kind: "true" };
    const half = Math.ceil(n / 2);
    const between = `e${depth}`;
    return exists(between, and(apart(half, between, element), farFromEnd(n - half, between, depth + 1)));
  };

  it("are those of the integers", () => {
    for (const k of whole(1, 5))
      for (const n of whole(1, 7)) {
        const sentence = forall(["x", "y"], implies(atom(S, "x", "y"), apart(n, "x", "y")));
        expect(truth(structureOn("integers", order, step(k)), sentence), `${k} is at least ${n}`).toBe(
          k >= n,
        );
      }
  });

  it("are positions on the natural numbers", () => {
    for (const k of whole(0, 6))
      for (const n of whole(0, 7)) {
        const sentence = exists("x", and(atom(P, "x"), farFromEnd(n, "x")));
        expect(truth(structureOn("naturals", order, at(k)), sentence), `${k} is at least ${n}`).toBe(k >= n);
      }
  });
});

describe("z3-solver in linear arithmetic", () => {
  let oracle: Oracle;
  beforeAll(async () => {
    oracle = await startOracle();
  });
  afterAll(() => oracle.close());

  it("agrees with both evaluators on 120 sentences of depth 1 to 4", async () => {
    const { wrong, spread } = await compareMany([10, 10, 10, 10], seed, oracle);
    expect(wrong, `seed ${seed}`).toEqual([]);
    expect(spread.true + spread.false + spread.unknown).toBe(120);
    expect(spread.unknown).toBeLessThanOrEqual(2);
    expect(Math.min(spread.true, spread.false)).toBeGreaterThan(30);
  });
});
