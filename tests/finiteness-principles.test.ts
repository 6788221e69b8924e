/** The principles by which there is no finite model: on all small structures, against counting, and each of their forms. */
import fc from "fast-check";
import { describe, expect, it } from "vitest";
import {
  type CountedRelation,
  MOST_COUNTED,
  obligationRecordsOf,
  obligationsOf,
  type PairsRecord,
  type PrincipleRecord,
} from "../lib/logic/records/finiteness.ts";
import { type FormulaRecord, freeVariables } from "../lib/logic/records/formulas.ts";
import { type Interpretation, interpretationsOn, isTrue } from "./support/evidence-judge.ts";
import { kindsByCounting } from "./support/finite-principles.ts";
import { principles } from "./support/random-principles.ts";
import { relationsUpToIsomorphism } from "./support/small-relations.ts";

const seed = Number(process.env.TWOPLACE_SEED ?? 20261201);
const options = (numRuns: number) => ({ seed, numRuns, verbose: 1 as const });

/** One two-place relation R: all structures on up to 3 points, one of each class of isomorphic ones. */
const small: readonly Interpretation[] = [1, 2, 3].flatMap((size) =>
  relationsUpToIsomorphism(size).map((pairs) => {
    const held = new Set(pairs.map(([x, y]) => `${x! - 1} ${y! - 1}`));
    return {
      size,
      holds: (_: string, points: readonly number[]) => held.has(points.join(" ")),
      value: noValue,
    };
  }),
);

/** A structure with R and P on so many points, from bits. */
function structureOf(size: number, bits: readonly boolean[]): Interpretation {
  return {
    size,
    holds: (_, points) =>
      bits[points.length === 1 ? points[0]! : size + points[0]! * size + points[1]!] === true,
    value: noValue,
  };
}

function noValue(name: string): never {
  throw new Error(`${name} is no relation`);
}

const R: CountedRelation = ["R", 2];
const P: CountedRelation = ["P", 1];

describe(`principles (random ones; seed ${seed})`, () => {
  it("cannot have all they ask for on a finite set: one relation, all structures up to 3 points", () => {
    fc.assert(
      fc.property(principles([R]), (principle) => {
        const obligations = obligationsOf(principle)!;
        for (const over of small)
          expect(obligations.every((obligation) => isTrue(obligation, over))).toBe(false);
      }),
      options(100),
    );
  });

  it("nor with two relations on 4 points", () => {
    const structures = fc.array(fc.boolean(), { minLength: 20, maxLength: 20 });
    fc.assert(
      fc.property(principles([P, R]), structures, (principle, bits) => {
        const over = structureOf(4, bits);
        expect(obligationsOf(principle)!.every((obligation) => isTrue(obligation, over))).toBe(false);
      }),
      options(400),
    );
  });

  it("ask, kind by kind, for what counting finds", () => {
    const structures = fc
      .integer({ min: 1, max: 3 })
      .chain((size) =>
        fc.array(fc.boolean(), { minLength: 12, maxLength: 12 }).map((bits) => structureOf(size, bits)),
      );
    fc.assert(
      fc.property(principles([P, R]), structures, (principle, over) => {
        const byKind: Record<string, boolean> = {};
        for (const { kind, sentence } of obligationRecordsOf(principle)!) {
          expect(freeVariables(sentence)).toEqual([]);
          byKind[kind] = (byKind[kind] ?? true) && isTrue(sentence, over);
        }
        const expected = kindsByCounting(principle, over);
        // Where no elements are as the parameters have to be, only that is asked for certain.
        if (expected.parameters === false) expect(byKind.parameters).toBe(false);
        else expect(byKind).toEqual(expected);
      }),
      options(1_500),
    );
  });
});

const is = (name: string, ...args: string[]): FormulaRecord => ["is", name, ...args];
const everything: FormulaRecord = ["true"];
const xy = is("R", "x", "y");
const loose = { parameters: [], given: null, domain: everything, relation: xy } as const;
const counting = {
  principle: "counting",
  ...loose,
  everywhere: false,
  different: "identity",
  successors: 1,
  predecessors: 1,
  spare: "fewer-predecessors",
} as const;
const pairs: PairsRecord = {
  principle: "pairs",
  ...loose,
  pairs: 1,
  different: "identity",
  relation: is("F", "x", "y", "z"),
};
const inP: FormulaRecord = is("P", "x");

describe("each obligation of a principle is needed", () => {
  const forms: readonly (readonly [string, PrincipleRecord])[] = [
    ["endless order", { principle: "endless-order", ...loose, everywhere: false }],
    ["endless order on a part", { principle: "endless-order", ...loose, domain: inP, everywhere: true }],
    [
      "endless order above an element",
      {
        ...{ principle: "endless-order", everywhere: false, relation: xy, domain: is("R", "a", "x") },
        ...{ parameters: ["a"], given: is("P", "a") },
      },
    ],
    ["one to one and not onto", counting],
    ["onto and not one to one", { ...counting, spare: "more-successors" }],
    ["two successors and one predecessor", { ...counting, successors: 2, spare: null, domain: inP }],
    ["two of each and one with fewer", { ...counting, successors: 2, predecessors: 2 }],
    ["without identity", { ...counting, different: [R] }],
    ["without identity, more successors", { ...counting, spare: "more-successors", different: [R] }],
    ["comprehension", { principle: "comprehension", ...loose, different: "identity" }],
    ["comprehension on a part", { principle: "comprehension", ...loose, domain: inP, different: [P, R] }],
  ];

  it.each(forms)(
    "%s: without those of one kind, some structure on up to 3 points is left",
    (_, principle) => {
      const obligations = obligationRecordsOf(principle)!;
      const structures = [1, 2, 3].flatMap((size) => interpretationsOn(size, ["P/1", "R/2"])!);
      const isLeft = (without: string) =>
        structures.some((over) =>
          obligations.every(({ kind, sentence }) => kind === without || isTrue(sentence, over)),
        );
      expect(isLeft("none")).toBe(false);
      for (const { kind } of obligations) expect([kind, isLeft(kind)]).toEqual([kind, true]);
    },
  );

  it("pairs", () => {
    /** By kind: each pair has a value; no value is shared; there are two elements. */
    const asked = (size: number, holds: (x: number, y: number, z: number) => boolean) => {
      const over = {
        size,
        holds: (_: string, [x, y, z]: readonly number[]) => holds(x!, y!, z!),
        value: noValue,
      };
      return (["values", "predecessors", "size"] as const).map((wanted) =>
        obligationRecordsOf(pairs)!.every(({ kind, sentence }) => kind !== wanted || isTrue(sentence, over)),
      );
    };
    expect(asked(2, () => true)).toEqual([true, false, true]);
    expect(asked(2, (x, y, z) => x === z && y === z)).toEqual([false, true, true]);
    expect(asked(1, () => true)).toEqual([true, true, false]);
  });
});

describe("obligations", () => {
  it("are as short as can be", () => {
    expect(obligationsOf({ principle: "endless-order", ...loose, everywhere: false })).toEqual([
      ["forall", "x", ["not", is("R", "x", "x")]],
      [
        "forall",
        "x",
        ["forall", "y", ["forall", "z", ["implies", ["and", xy, is("R", "y", "z")], is("R", "x", "z")]]],
      ],
      ["forall", "x", ["exists", "y", xy]],
    ]);
    expect(obligationsOf(counting)).toEqual([
      ["forall", "x", ["exists", "y", xy]],
      [
        "forall",
        "x",
        [
          "forall",
          "y",
          ["forall", "z", ["implies", ["and", is("R", "x", "z"), is("R", "y", "z")], ["=", "x", "y"]]],
        ],
      ],
      ["exists", "y", ["forall", "x", ["not", xy]]],
    ]);
  });

  it("do not wrap in parameters what does not speak of them", () => {
    const principle: PrincipleRecord = {
      ...{ principle: "endless-order", everywhere: true, relation: xy, domain: is("R", "a", "x") },
      ...{ parameters: ["a"], given: is("P", "a") },
    };
    expect(obligationsOf(principle)!.map((one) => one[0] === "forall" && one[1] === "a")).toEqual([
      false,
      true,
      false,
      false,
      true,
    ]);
  });

  it("of a principle that is not of its form are none", () => {
    const order = { principle: "endless-order", ...loose, everywhere: false } as const;
    const wrong: readonly PrincipleRecord[] = [
      { ...order, domain: xy },
      { ...order, relation: is("R", "x", "z") },
      { ...order, relation: is("R", "x", "a") },
      { ...order, parameters: ["a"] },
      { ...order, given: everything },
      { ...order, parameters: ["a"], given: is("P", "x") },
      { ...order, parameters: ["a", "a"], given: is("P", "a") },
      { ...order, parameters: ["x"], given: is("P", "x") },
      { ...counting, successors: 0 },
      { ...counting, successors: 1.5, predecessors: 1, spare: null },
      { ...counting, predecessors: 2 },
      { ...counting, predecessors: 0, spare: null },
      { ...counting, spare: null },
      { ...counting, successors: 2 },
      { ...counting, successors: MOST_COUNTED + 1, predecessors: MOST_COUNTED + 1 },
      { ...counting, different: [] },
      { ...counting, different: [["R", 3]] },
      { ...counting, different: [R], relation: ["and", xy, ["=", "x", "y"]] },
      { ...counting, different: [R], domain: inP },
      { ...pairs, pairs: 0 },
      { principle: "comprehension", ...loose, relation: is("F", "x", "y", "z"), different: "identity" },
    ];
    for (const principle of wrong) expect(obligationsOf(principle), JSON.stringify(principle)).toBeNull();
    expect(
      obligationsOf({ ...counting, successors: MOST_COUNTED, predecessors: MOST_COUNTED }),
    ).not.toBeNull();
    let large: FormulaRecord = xy;
    for (let i = 0; i < 14; i += 1) large = ["and", large, large];
    expect(obligationsOf({ ...order, relation: large })).toBeNull();
  });
});
