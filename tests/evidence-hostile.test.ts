/**
 * Evidence that nobody would write in good faith: absurd structures, free terms and reasons are refused with a clear
 * reason, soon and within bounds of memory. What takes long is paid for from the meter.
 */
import { describe, expect, it } from "vitest";
import { checkEvidence, meterForCheck } from "../lib/evidence/check.ts";
import { digestOf } from "../lib/evidence/digest.ts";
import type { Evidence, PrincipleRecord } from "../lib/evidence/format.ts";
import { DEFAULT_BUDGET, Meter } from "../lib/logic/meter.ts";
import { obligationsOf } from "../lib/logic/records/finiteness.ts";
import { sameUpToNames } from "../lib/logic/records/formulas.ts";

/** Anything that JSON can say. */
type Json = unknown;

/** Steps within which a test is over in a second. */
const FEW_STEPS = 300;

function check(
  parts: { readonly sentences: Json; readonly question: Json } & Readonly<Record<string, Json>>,
  steps = FEW_STEPS,
) {
  const evidence = { format: "twoplace-evidence", version: 1, verdict: "holds", facts: [], ...parts };
  return checkEvidence({ ...evidence, digest: digestFor(evidence as unknown as Evidence) }, new Meter(steps));
}

/** The digest, where the question is not so deep that it has none. */
function digestFor({ sentences, question }: Evidence): string {
  try {
    return digestOf(sentences, question);
  } catch {
    return "";
  }
}

function expectRefusal(result: ReturnType<typeof check>, reason: RegExp): void {
  expect(result).toMatchObject({ accepted: false, reason: expect.stringMatching(reason) });
}

/** So many levels of something around a core. */
function nested(levels: number, around: (inner: Json) => Json, core: Json): Json {
  let value = core;
  for (let level = 0; level < levels; level += 1) value = around(value);
  return value;
}

const names = (count: number) => Array.from({ length: count }, (_, number) => `v${number}`);
const forall = (variables: readonly string[], body: Json): Json =>
  variables.reduceRight<Json>((inner, variable) => ["forall", variable, inner], body);

/** True of all elements, and to be looked at for each of so many. */
function tautology(depth: number): Json {
  const variables = names(depth);
  const pairs = variables.flatMap((x, number) => variables.slice(number + 1).map((y) => ["is", "R", x, y]));
  return forall(variables, ["or", ["false"], ...pairs.flatMap((pair) => [pair, ["not", pair]])]);
}

const irreflexive = ["forall", "x", ["not", ["is", "R", "x", "x"]]];
const rationals = { kind: "dense-line", colours: 1 };
const naturals = { kind: "half-line", offset: 0, ends: 0 };
const point = { kind: "points", size: 1 };
const nowhere = { R: { places: 2, holds: [] } };

/** The claim that a sentence is true in a structure. */
function truth(carrier: Json, sentence: Json = irreflexive, tables: Json = nowhere) {
  return check({
    sentences: [sentence],
    question: { ask: "true-in", structure: { carrier, tables }, sentence: 0 },
  });
}

/** The claim that a sentence has a model, with the structure as a fact. */
function model(carrier: Json, sentence: Json = irreflexive, tables: Json = nowhere) {
  return check({
    sentences: [sentence],
    question: { ask: "consistent", axioms: [0] },
    facts: [{ fact: "structure", structure: { carrier, tables }, holds: [0], fails: null }],
  });
}

describe("structures", () => {
  it("are taken where there is nothing wrong with them", () => {
    for (const carrier of [
      rationals,
      naturals,
      point,
      { kind: "forest", branching: 1, rooted: false, offset: 1000, ends: 0 },
    ]) {
      expect(truth(carrier)).toMatchObject({ accepted: true });
      expect(model(carrier)).toMatchObject({ accepted: true });
    }
  });

  it.each<[string, Json, RegExp]>([
    ["a huge offset", { kind: "integer-line", offset: 1e9 }, /not a whole number from 0 to 1000/],
    ["an offset of parts", { kind: "integer-line", offset: 0.5 }, /not a whole number/],
    ["an offset that is none", { kind: "half-line", offset: null, ends: 0 }, /not a whole number/],
    ["huge ends", { kind: "half-line", offset: 0, ends: 1001 }, /not a whole number from 0 to 1000/],
    ["no colours", { kind: "dense-line", colours: 0 }, /not a whole number from 1 to 100/],
    ["a thousand colours", { kind: "dense-line", colours: 1000 }, /not a whole number from 1 to 100/],
    ["no points", { kind: "points", size: 0 }, /not a whole number from 1/],
    ["too many points", { kind: "points", size: 1_000_001 }, /not a whole number from 1/],
    ["a zero without a top", { kind: "boolean-algebra", zero: true, top: false }, /no Boolean algebra/],
    ["a zero that is one", { kind: "boolean-algebra", zero: 1, top: true }, /neither true nor false/],
    ["a sum of one part", { kind: "sum", parts: [rationals] }, /has 1 parts/],
    ["a sum of nothing", { kind: "sum", parts: [] }, /has 0 parts/],
    ["tuples of no widths", { kind: "tuples", over: rationals, widths: [] }, /has 0 parts/],
    ["a negative width", { kind: "tuples", over: rationals, widths: [-1] }, /not a whole number/],
    ["a width of a million", { kind: "tuples", over: rationals, widths: [1e6] }, /not a whole number from 0 to 50/],
    ["a million widths", { kind: "tuples", over: rationals, widths: Array(1e6).fill(0) }, /1000000 components, more than 50/],
    ["51 copies", { kind: "tuples", over: rationals, widths: Array(51).fill(1) }, /51 components, more than 50/],
    ["tuples of tuples", nested(6, (over) => ({ kind: "tuples", over, widths: [2] }), rationals), /64 components/],
    ["pairs beside pairs", { kind: "sum", parts: Array(26).fill({ kind: "tuples", over: rationals, widths: [2] }) }, /52 components/],
    ["products of products", nested(50, (inner) => ({ kind: "product", outer: point, inner }), rationals), /51 components/],
    ["no children", { kind: "forest", branching: 0, rooted: true, offset: 1, ends: 1 }, /not a whole number from 1/],
    ["an unknown class", { kind: "generic", of: "hypergraph" }, /none of graph/],
    ["an unknown kind", { kind: "reals" }, /unknown kind "reals"/],
    ["a kind of JavaScript", { kind: "constructor" }, /unknown kind "constructor"/],
    ["no kind", {}, /unknown kind undefined/],
    ["a word", "dense-line", /unknown kind/],
    ["nothing", null, /unknown kind/],
    ["a foreign key", { kind: "dense-tree", offset: 1 }, /foreign key "offset"/],
    ["a missing key", { kind: "half-line", offset: 1 }, /lacks "ends"/],
    ["a component that is none", { kind: "product", outer: rationals, inner: { kind: "reals" } }, /unknown kind "reals"/],
    ["a thousand levels", nested(1_000, (over) => ({ kind: "tuples", over, widths: [1] }), rationals), /too large/],
    ["a hundred thousand levels", nested(100_000, (over) => ({ kind: "tuples", over, widths: [1] }), rationals), /nested more than/],
  ])("on a carrier with %s", (_, carrier, reason) => {
    expectRefusal(truth(carrier), reason);
    expectRefusal(model(carrier), reason);
  }); // biome-ignore format: a row each

  it.each<[string, Json, RegExp]>([
    ["kinds that there are not", { R: { places: 2, holds: [0, 3] } }, /R has numbers of kinds that are not kinds here/],
    ["kinds below 0", { R: { places: 2, holds: [-1] } }, /not a whole number/],
    ["kinds in disorder", { R: { places: 2, holds: [1, 0] } }, /not in ascending order/],
    ["kinds twice", { R: { places: 2, holds: [1, 1] } }, /not in ascending order/],
    ["other places", { R: { places: 3, holds: [] } }, /R has 3 places in/],
    ["no places", { R: { places: 0, holds: [] } }, /not a whole number from 1 to 100/],
    ["a billion places", { R: { places: 1e9, holds: [] } }, /not a whole number from 1 to 100/],
    ["fifty places besides", { ...nowhere, S: { places: 50, holds: [] } }, /the kinds of tuples for S are too many to list/],
    ["another relation", { S: { places: 2, holds: [] } }, /does not say what R is/],
    ["a relation of JavaScript", { toString: { places: 2, holds: [] } }, /does not say what R is/],
  ])("with tables of %s", (_, tables, reason) => {
    expectRefusal(truth(rationals, irreflexive, tables), reason);
    expectRefusal(model(rationals, irreflexive, tables), reason);
  }); // biome-ignore format: a row each

  const algebra = { kind: "boolean-algebra", zero: true, top: true };
  const forest = { kind: "forest", branching: 2, rooted: true, offset: 1, ends: 1 };
  it.each<[string, Json, number]>([
    ["the rational line", rationals, 12],
    ["the half line", naturals, 12],
    ["an integer line with large differences", { kind: "integer-line", offset: 1000 }, 3],
    ["the dense tree", { kind: "dense-tree" }, 12],
    ["the generic digraph", { kind: "generic", of: "digraph" }, 12],
    ["a Boolean algebra", algebra, 12],
    ["a forest", forest, 12],
    ["a forest with distant steps", { ...forest, rooted: false, offset: 300 }, 3],
    ["pairs", { kind: "tuples", over: naturals, widths: [2] }, 5],
    ["a product", { kind: "product", outer: rationals, inner: { kind: "integer-line", offset: 0 } }, 12],
    ["a sum", { kind: "sum", parts: [naturals, { kind: "dense-tree" }] }, 12],
    ["a sum in a sum in a sum …", nested(49, (part) => ({ kind: "sum", parts: [part, point] }), rationals), 3],
    ["a product in a product …", nested(49, (inner) => ({ kind: "product", outer: point, inner }), rationals), 3],
    ["50 points in 50 parts", { kind: "sum", parts: Array(50).fill(point) }, 4],
    ["a million points", { kind: "points", size: 1_000_000 }, 3],
  ])("with sentences that are too deep: %s", (_, carrier, depth) => {
    expectRefusal(truth(carrier, tautology(depth)), /^the check ended early: (budget|memory)$/);
  }); // biome-ignore format: a row each

  it.each<[string, Json]>([
    ["a thousand points a thousand times over", { kind: "product", outer: { kind: "points", size: 1e6 }, inner: { kind: "points", size: 1e6 } }],
    ["triples of a million points", { kind: "tuples", over: { kind: "points", size: 1e6 }, widths: [3] }],
    ["large differences and ends", { kind: "half-line", offset: 1000, ends: 1000 }],
    ["far steps among 50 children", { kind: "forest", branching: 50, rooted: true, offset: 1000, ends: 1000 }],
  ])("with more kinds of pairs than can be listed: %s", (_, carrier) => {
    expectRefusal(truth(carrier), /the kinds of tuples for R are too many to list/);
  }); // biome-ignore format: a row each

  it("with two variables that take turns for dozens of levels", () => {
    const either = ["or", ["is", "R", "x", "y"], ["not", ["is", "R", "x", "y"]]];
    let deep: Json = ["true"];
    for (let level = 0; level < 60; level += 1)
      deep = ["forall", level % 2 === 0 ? "x" : "y", ["and", either, deep]];
    // What recurs is not worked out again; on the half line listing itself runs out.
    expect(truth(rationals, ["forall", "x", deep])).toMatchObject({ accepted: true });
    expectRefusal(truth(naturals, ["forall", "x", deep]), /ended early/);
  });

  it("with quantifiers that each list a million points: not all are kept in memory", () => {
    const deep = forall(names(20), ["true"]);
    const question = {
      ask: "true-in",
      structure: { carrier: { kind: "points", size: 1_000_000 }, tables: {} },
      sentence: 0,
    };
    expectRefusal(check({ sentences: [deep], question }, 50_000), /ended early: memory/);
  });

  it("that list much and look at little pay for what they list", () => {
    const carrier = { kind: "half-line", offset: 1000, ends: 1000 };
    const question = { ask: "true-in", structure: { carrier, tables: {} }, sentence: 0 };
    const result = check({ sentences: [["exists", "x", ["=", "x", "x"]]], question });
    // Only the first is looked at.
    expect(result.accepted && result.steps > 1).toBe(true);
  });

  it("on carriers of many parts, which cost more", () => {
    const steps = (parts: number) => {
      const carrier = { kind: "sum", parts: Array(parts).fill({ kind: "points", size: 50 / parts }) };
      const question = { ask: "true-in", structure: { carrier, tables: nowhere }, sentence: 0 };
      const result = check({ sentences: [tautology(2)], question }, 1_000);
      return result.accepted ? result.steps : Number.NaN;
    };
    expect(steps(50)).toBeGreaterThan(steps(2) + 100);
  });

  it("again and again: the meter pays for them", () => {
    const structure = { carrier: { kind: "dense-line", colours: 100 }, tables: nowhere };
    const fact = { fact: "structure", structure, holds: [0], fails: null };
    const question = { ask: "consistent", axioms: [0] };
    const facts = Array(5_000).fill(fact);
    expectRefusal(check({ sentences: [["true"]], question, facts }), /ended early: budget/);
    const tables = Object.fromEntries(names(5_000).map((name) => [name, nowhere.R]));
    expectRefusal(
      check({ sentences: [["true"]], question, facts: [{ ...fact, structure: { ...structure, tables } }] }),
      /ended early: budget/,
    );
  });

  it("with a large table and a short sentence a hundred thousand times are no trouble", () => {
    const tables = { R: { places: 2, holds: Array.from({ length: 80_000 }, (_, kind) => kind) } };
    const fact = {
      fact: "structure",
      structure: { carrier: { kind: "points", size: 300 }, tables },
      fails: null,
    };
    const question = { ask: "consistent", axioms: [0] };
    const facts = [{ ...fact, holds: Array(100_000).fill(0) }];
    expect(check({ sentences: [["true"]], question, facts })).toMatchObject({ accepted: true });
  });

  it("where nothing is said to be false", () => {
    const fact = {
      fact: "structure",
      structure: { carrier: rationals, tables: nowhere },
      holds: [0],
      fails: [],
    };
    const question = { ask: "consistent", axioms: [0] };
    expectRefusal(check({ sentences: [irreflexive], question, facts: [fact] }), /said to fail/);
  });
});

describe("sentences", () => {
  it("with free variables, however many and deep, are refused from outside", () => {
    const wide = ["and", ...names(50_000).map((x) => ["is", "R", x, x])];
    const deep = nested(1_900, (inner) => ["and", ["true"], inner], wide);
    expectRefusal(truth(rationals, deep), /free variable v0/);
    expectRefusal(
      truth(rationals, ["and", ["forall", "x", ["true"]], ["is", "R", "x", "x"]]),
      /free variable x/,
    );
    expectRefusal(truth(rationals, ["forall", "y", ["=", "x", "y"]]), /free variable x/);
    expect(truth(rationals, forall(["x", "x"], ["=", "x", "x"]))).toMatchObject({ accepted: true });
  });

  it("with functions are none", () => {
    expectRefusal(truth(rationals, ["exists", "x", ["is", "R", "x", ["f", "x"]]]), /not a name/);
  });
});

const transitive = forall(["x", "y", "z"], [
  "implies",
  ["and", ["is", "R", "x", "y"], ["is", "R", "y", "z"]],
  ["is", "R", "x", "z"],
]); // biome-ignore format: as it is read
const serial = ["forall", "x", ["exists", "y", ["is", "R", "x", "y"]]];
const axioms = [irreflexive, transitive, serial];

/** The claim that endless orders have no finite model, by a principle. */
function reason(principle: Json, times = 1, sentences: readonly Json[] = axioms) {
  const own = [...sentences.keys()];
  return check({
    sentences,
    question: { ask: "no-finite-model", axioms: own },
    facts: Array(times).fill({ fact: "no-finite-model", axioms: own, principle }),
  });
}

const common = { parameters: [], given: null, domain: ["true"], relation: ["is", "R", "x", "y"] };
const endless = { principle: "endless-order", ...common, everywhere: false };
const counting = {
  ...{ principle: "counting", ...common, everywhere: false, different: "identity" },
  ...{ successors: 1, predecessors: 1, spare: "fewer-predecessors" },
};
const pairs = {
  principle: "pairs",
  ...common,
  relation: ["is", "T", "x", "y", "z"],
  different: "identity",
  pairs: 1,
};
const comprehension = { principle: "comprehension", ...common, different: "identity" };

describe("reasons", () => {
  it("are taken where there is nothing wrong with them", () => {
    expect(reason(endless)).toMatchObject({ accepted: true });
    expect(reason({ ...endless, parameters: ["p", "q"], given: ["true"] })).toMatchObject({ accepted: true });
    expect(reason({ ...endless, everywhere: true })).toMatchObject({ accepted: true });
  });

  const wrongForm = /the principle is not of its form/;
  it.each<[string, object, RegExp]>([
    ["a parameter called x", { ...endless, parameters: ["x"], given: ["true"] }, wrongForm],
    ["a parameter called y", { ...endless, parameters: ["p", "y"], given: ["true"] }, wrongForm],
    ["a parameter called z", { ...endless, parameters: ["z"], given: ["true"] }, wrongForm],
    ["a parameter twice", { ...endless, parameters: ["p", "p"], given: ["true"] }, wrongForm],
    ["a parameter without a name", { ...endless, parameters: [""], given: ["true"] }, /not a name/],
    ["parameters of which nothing is said", { ...endless, parameters: ["p"] }, wrongForm],
    ["something said of no parameters", { ...endless, given: ["true"] }, wrongForm],
    ["a free variable of the parameters", { ...endless, parameters: ["p"], given: ["is", "R", "p", "x"] }, /given has the free variable x/],
    ["a free variable of the domain", { ...endless, domain: ["is", "R", "x", "w"] }, /domain has the free variable w/],
    ["the second variable in the domain", { ...endless, domain: ["is", "R", "x", "y"] }, /domain has the free variable y/],
    ["a free variable of the relation", { ...endless, relation: ["is", "R", "x", "w"] }, /relation has the free variable w/],
    ["a third variable of a relation of two", { ...endless, relation: ["is", "R", "x", "z"] }, wrongForm],
    ["captured variables", { ...endless, domain: ["exists", "y", ["is", "R", "x", "y"]] }, /what it asks for at 0 is not derived/],
    ["bound variables of the same name", { ...endless, relation: ["and", ["is", "R", "x", "y"], ["exists", "x", ["is", "R", "x", "x"]]] }, /is not derived/],
    ["functions", { ...endless, relation: ["is", "R", "x", ["f", "x"]] }, /not a name/],
    ["a hundred thousand parameters", { ...endless, parameters: names(100_000), given: ["true"] }, /more than 100 parameters/],
    ["a billion successors", { ...counting, successors: 1e9, predecessors: 1e9 }, wrongForm],
    ["more successors than are counted", { ...counting, successors: 13, predecessors: 13 }, wrongForm],
    ["no successors", { ...counting, successors: 0, predecessors: 0 }, wrongForm],
    ["no predecessors", { ...counting, predecessors: 0, spare: null }, wrongForm],
    ["more predecessors than successors", { ...counting, predecessors: 2 }, wrongForm],
    ["half a successor", { ...counting, successors: 1.5 }, /not a whole number/],
    ["nothing to tip the balance", { ...counting, spare: null }, wrongForm],
    ["the balance tipped twice", { ...counting, successors: 2 }, wrongForm],
    ["another way to tip it", { ...counting, spare: "more-predecessors" }, /none of fewer-predecessors/],
    ["a billion pairs", { ...pairs, pairs: 1e9 }, wrongForm],
    ["no pairs", { ...pairs, pairs: 0 }, wrongForm],
    ["differences by no relation", { ...counting, different: [] }, wrongForm],
    ["differences by a relation that is not theirs", { ...counting, different: [["S", 2]] }, wrongForm],
    ["differences by a relation of other places", { ...counting, different: [["R", 3]] }, wrongForm],
    ["differences by a relation of no places", { ...counting, different: [["R", 2], ["S", 0]] }, /not a whole number from 1/],
    ["differences by a relation of a billion places", { ...counting, different: [["R", 2], ["S", 1e9]] }, wrongForm],
    ["differences by a relation of 100 places, counted often", { ...counting, successors: 12, predecessors: 12, different: [["R", 2], ["S", 100]] }, wrongForm],
    ["differences by a relation again and again", { ...counting, different: [["R", 2], ...Array(300_000).fill(["S", 2])] }, wrongForm],
    ["differences by relations, and =", { ...counting, different: [["R", 2]], domain: ["=", "x", "x"] }, wrongForm],
    ["differences by a relation called like a variable, and =", { ...counting, different: [["R", 2], ["x", 1]], domain: ["=", "x", "x"] }, wrongForm],
    ["differences by relations, and = in the relation", { ...comprehension, different: [["R", 2]], relation: ["=", "x", "y"] }, wrongForm],
    ["differences by something", { ...counting, different: "equality" }, /not a list/],
    ["a huge domain", { ...endless, domain: ["and", ...Array(90_000).fill(["is", "R", "x", "x"])] }, wrongForm],
    ["a deep domain", { ...endless, domain: nested(1_900, (inner) => ["not", inner], ["is", "R", "x", "x"]) }, /is not derived|not of its form|too large/],
    ["an unknown principle", { ...endless, principle: "compactness" }, /unknown kind "compactness"/],
    ["the keys of another principle", { ...endless, different: "identity" }, /foreign key "different"/],
    ["pairs of two-place relations", { ...pairs, relation: ["is", "R", "x", "y"] }, /is not derived/],
  ])("with %s", (_, principle, why) => {
    expectRefusal(reason(principle), why);
  }); // biome-ignore format: a row each

  it("whose parameters have names that variables of what is asked for could have", () => {
    const about = (parameter: string): PrincipleRecord[] => {
      const given = ["is", "R", parameter, parameter];
      const relation = ["and", ["is", "R", "x", "y"], ["not", ["is", "R", "y", parameter]]];
      const own = { parameters: [parameter], given, domain: ["is", "R", "x", parameter], relation };
      return [
        { ...endless, ...own },
        { ...counting, ...own, successors: 7, predecessors: 7 },
        { ...counting, ...own, different: [["R", 2]], spare: "more-successors" },
        { ...pairs, ...own, pairs: 3 },
        { ...comprehension, ...own },
      ] as unknown as PrincipleRecord[];
    };
    const expected = about("p").map((principle) => obligationsOf(principle)!);
    for (const parameter of ["w", "u", "v", "x1", "y1", "x'", "w'"])
      for (const [place, principle] of about(parameter).entries()) {
        const obligations = obligationsOf(principle)!;
        expect(obligations.length).toBe(expected[place]!.length);
        for (const [number, obligation] of obligations.entries())
          expect(sameUpToNames(obligation, expected[place]![number]!), parameter).toBe(true);
      }
  });

  it("of which something is not derived", () => {
    for (const place of axioms.keys())
      expectRefusal(reason(endless, 1, axioms.toSpliced(place, 1)), /what it asks for at \d is not derived/);
  });

  it("that rest on axioms of others", () => {
    const question = { ask: "no-finite-model", axioms: [0, 1] };
    const facts = [{ fact: "no-finite-model", axioms: [0, 1, 2], principle: endless }];
    expectRefusal(check({ sentences: axioms, question, facts }), /do not bear out/);
    expectRefusal(
      check({
        sentences: axioms,
        question: { ...question, axioms: [0, 1, 2] },
        facts: [{ ...facts[0], axioms: [0, 1] }],
      }),
      /is not derived/,
    );
    expectRefusal(
      check({ sentences: axioms, question, facts: [{ ...facts[0], axioms: [0, 1, 3] }] }),
      /not a whole number from 0 to 2/,
    );
  });

  it("that rest on a derivation from other premises, or of a contradiction", () => {
    // From serial and not serial everything is derived, but not from the axioms.
    const sentences = [irreflexive, transitive, serial, ["not", serial]];
    const refutation = [["clause", 0, 0], ["clause", 1, 0], ["infer", [], [[0, {}], [1, {}]]]];
    const derivation = { fact: "derivation", premises: [2], conclusion: 2, made: [], lines: refutation };
    const fact = { fact: "no-finite-model", axioms: [0, 1], principle: endless };
    const question = { ask: "no-finite-model", axioms: [0, 1] };
    expectRefusal(check({ sentences, question, facts: [derivation, fact] }), /does not follow|is not derived/);
    expectRefusal(check({ sentences, question, facts: [fact, derivation] }), /is not derived/);
  }); // biome-ignore format: short lines

  it("again and again: the meter pays for them", () => {
    const domain = ["or", ["true"], ...Array(1_000).fill(["is", "R", "x", "x"])];
    expectRefusal(reason({ ...counting, domain }, 500), /not derived|ended early/);
    expect(reason(endless, 1_000)).toMatchObject({ accepted: true });
    const derivation = { fact: "derivation", premises: [0], conclusion: 0, made: [], lines: [] };
    const question = { ask: "no-finite-model", axioms: [0, 1, 2] };
    const own = { fact: "no-finite-model", axioms: [0, 1, 2], principle: endless };
    const facts = [...Array(60).fill(own), ...Array(5_000).fill(derivation)];
    expectRefusal(check({ sentences: axioms, question, facts }), /ended early: budget/);
  });
});

const successors = {
  constructors: { e: [], f: ["a", "b"] },
  relations: {
    R: { on: 1, others: ["w"], cases: { e: ["false"], f: ["or", ["is", "R", "w", "a"], ["=", "w", "b"]] } },
  },
};
/** Some element has nothing before it. */
const first = ["exists", "x", ["forall", "y", ["not", ["is", "R", "y", "x"]]]];
const firstShown = [["instances", ["e"]]];

/** The claim that a sentence has a model of free terms. */
function ofTerms(certificates: Json, sentence: Json = first, terms: Json = successors, fails: Json = null) {
  const facts = [{ fact: "terms", terms, holds: [0], fails, certificates }];
  // One certificate alone may take a thousand.
  return check({ sentences: [sentence], question: { ask: "consistent", axioms: [0] }, facts }, 2_000);
}

describe("free terms", () => {
  it("are taken where there is nothing wrong with them", () => {
    expect(ofTerms([firstShown])).toMatchObject({ accepted: true });
  });

  const notShown = /certificate 0 does not show that its sentence is true/;
  const chain = (levels: number) => nested(levels, (steps) => [["cases", "1", { e: [], f: steps }]], []);
  const term = (levels: number) => nested(levels, (inner) => ["f", inner, ["e"]], ["e"]);
  it.each<[string, Json, RegExp]>([
    ["no certificate", [], /there must be 1 certificates/],
    ["two certificates", [firstShown, firstShown], /there must be 1 certificates/],
    ["a certificate without steps", [[]], notShown],
    ["a certificate that is none", [null], notShown],
    ["a certificate of another sentence", [[["instances", ["f", ["e"], ["e"]]]]], notShown],
    ["nested cases", [chain(150)], notShown],
    ["nested cases beyond the bound", [chain(400)], notShown],
    ["nested cases beyond all bounds", [chain(1_000)], /nested more than/],
    ["a deep term", [[["instances", term(190)]]], notShown],
    ["a term beyond the bound", [[["instances", term(1_500)]]], notShown],
    ["a term with a foreign constructor", [[["instances", ["g"]]]], notShown],
    ["a term with a constructor of JavaScript", [[["instances", ["toString"]]]], notShown],
    ["a variable that is no parameter", [[["instances", "1"]]], notShown],
    ["a hundred thousand terms", [[["instances", ...Array(100_000).fill(["f", ["e"], ["e"]])]]], notShown],
    ["cases of a parameter that there is not", [[["cases", "1", { e: [], f: [] }]]], notShown],
    ["cases that lack a constructor", [[["cases", "1", { e: [] }]]], notShown],
  ])("with %s", (_, certificates, why) => {
    expectRefusal(ofTerms(certificates), why);
  });

  it.each<[string, Json]>([
    ["no constant", { ...successors, constructors: { f: ["a", "b"] } }],
    ["constants alone", { constructors: { e: [] }, relations: {} }],
    ["a recursion that goes up", recursion(["is", "R", "a", "w"])],
    ["a recursion on the same term", recursion(["is", "R", "w", "w"])],
    ["a free variable", recursion(["=", "w", "c"])],
    ["a quantifier", recursion(["exists", "c", ["=", "w", "c"]])],
    ["a relation that there is not", recursion(["is", "S", "w", "a"])],
    ["a relation of JavaScript", recursion(["is", "toString", "w", "a"])],
    ["other places", recursion(["is", "R", "w", "a", "b"])],
    ["an argument called like another place", { constructors: { e: [], f: ["w", "b"] }, relations: successors.relations }],
    ["an argument twice", { ...successors, constructors: { e: [], f: ["a", "a"] } }],
    ["a recursion on a place that there is not", place(2)],
    ["a recursion on a negative place", place(-1)],
    ["a missing case", { ...successors, relations: { R: { on: 1, others: ["w"], cases: { e: ["false"] } } } }],
    ["a case too many", recursion(["false"], { g: ["false"] })],
    ["a foreign key", { ...successors, sorts: 1 }],
    ["a hundred thousand constructors", { constructors: Object.fromEntries(names(100_000).map((name) => [name, []])), relations: {} }],
  ])("of a record with %s", (_, terms) => {
    expectRefusal(ofTerms([firstShown], first, terms), /does not define a structure of free terms/);
  }); // biome-ignore format: a row each

  function recursion(body: Json, more: object = {}): Json {
    const cases = { e: ["false"], f: body, ...more };
    return { ...successors, relations: { R: { on: 1, others: ["w"], cases } } };
  }
  function place(on: number): Json {
    return { ...successors, relations: { R: { ...successors.relations.R, on } } };
  }

  it("in which not all of some sentences are true", () => {
    const sentences = [
      first,
      ["forall", "x", ["exists", "y", ["is", "R", "y", "x"]]],
      ["forall", "x", ["not", ["is", "R", "x", "x"]]],
    ];
    const fact = { fact: "terms", terms: successors, holds: [0], fails: [1, 2] };
    const question = { ask: "consistent", axioms: [0] };
    // That nothing is before c: of the two, the first is false.
    const refutation = [["instances", ["e"]]];
    const shows = (fails: Json, certificates: Json) =>
      check({ sentences, question, facts: [{ ...fact, fails, certificates }] }).accepted;
    expect(shows([1, 2], [firstShown, refutation])).toBe(true);
    expect(shows([2, 1], [firstShown, refutation])).toBe(false);
    expect(shows([2, 1], [firstShown, [["instances"], ...refutation]])).toBe(true);
    expect(shows([1], [firstShown, refutation])).toBe(true);
    expect(shows([2], [firstShown, refutation])).toBe(false);
    expect(shows([1, 2], [firstShown, []])).toBe(false);
    expect(shows([1, 2], [firstShown])).toBe(false);
    expect(shows([0], [firstShown, firstShown])).toBe(false);
    expect(shows([0, 2], [firstShown, firstShown])).toBe(false);
  });

  it("with steps after a distinction of cases, which is the last", () => {
    const same = ["forall", "x", ["=", "x", "x"]];
    const cases = ["cases", "1", { e: [], f: [] }];
    expect(ofTerms([[cases]], same)).toMatchObject({ accepted: true });
    expectRefusal(ofTerms([[cases, ["instances", ["e"]]]], same), notShown);
    expectRefusal(ofTerms([[cases, cases]], same), notShown);
  });

  it("that would take for ever", () => {
    const doubling = Array.from({ length: 20 }, (_, levels) => nested(levels, (one) => ["f", one, one], ["e"]));
    const some = ["exists", "x", ["exists", "y", ["and", ["is", "R", "x", "y"], ["is", "R", "y", "x"]]]];
    expectRefusal(ofTerms([[["instances", ...doubling]]], some), notShown);
    const twice = { on: 1, others: ["w"], cases: { e: ["false"], f: ["or", ["is", "R", ["f", "w"], "a"], ["is", "R", "w", "a"]] } };
    const exponential = { constructors: { e: [], f: ["a"] }, relations: { R: twice } };
    const tower = nested(60, (one) => ["f", one], ["e"]);
    const below = ["exists", "x", ["exists", "y", ["is", "R", "y", "x"]]];
    expectRefusal(ofTerms([[["instances", tower]]], below, exponential), notShown);
    const variables = names(20);
    const all = variables.flatMap((x) => variables.map((y) => ["or", ["is", "R", x, y], ["is", "R", y, x], ["=", x, y]]));
    expectRefusal(ofTerms([[]], forall(variables, ["not", ["and", ...all]])), notShown);
  }); // biome-ignore format: short lines

  it("where nothing is said to be false", () => {
    expectRefusal(ofTerms([firstShown, []], first, successors, []), /certificate 1 does not show/);
  });

  it("are not evaluated: a claim of what is true in them is none", () => {
    const question = { ask: "true-in", structure: successors, sentence: 0 };
    expectRefusal(check({ sentences: [first], question }), /lacks "carrier"/);
  });
});

describe("the meter of a check", () => {
  it("is the same with and without a small budget, and grows with a large one", () => {
    expect(meterForCheck().limit).toBeGreaterThan(DEFAULT_BUDGET);
    expect(meterForCheck().limit).toBeLessThan(Number.POSITIVE_INFINITY);
    expect(meterForCheck().limit).toBe(meterForCheck(10).limit);
    expect(meterForCheck(10 * DEFAULT_BUDGET).limit).toBe(10 * meterForCheck().limit);
  });
});
