/**
 * The checker: accepts what the searches produce, and rejects every change that makes it wrong. Whether changed
 * evidence is still right is judged by brute force, which shares nothing with the checker.
 */
import { describe, expect, it } from "vitest";
import { checkEvidence } from "../lib/evidence/check.ts";
import type { Evidence, StructureRecord } from "../lib/evidence/format.ts";
import { readEvidence } from "../lib/evidence/read.ts";
import { digestOf } from "../lib/evidence/record.ts";
import { checkFinite } from "../lib/inquiry/check-finite.ts";
import {
  askConsistent,
  askDoesNotEntail,
  askEntails,
  askEquivalent,
  askIndependent,
  askInfiniteOnly,
  askTruth,
} from "../lib/inquiry/claims.ts";
import { compareTheories } from "../lib/inquiry/compare.ts";
import { askDuals } from "../lib/inquiry/dualise.ts";
import { askIndependence } from "../lib/inquiry/independence.ts";
import { findModels } from "../lib/inquiry/models.ts";
import { unwatchedWork } from "../lib/inquiry/work.ts";
import { and, atom, equal, exists, type Formula, forall, implies, not, or } from "../lib/logic/formula.ts";
import { type Interpretation, isTrue } from "./support/brute-force.ts";
import { theoryFrom } from "./support/theories.ts";

const R = (x: string, y: string) => atom({ name: "R", places: 2, infix: false }, x, y);
const irreflexive = forall("x", not(R("x", "x")));
const transitive = forall(["x", "y", "z"], implies(and(R("x", "y"), R("y", "z")), R("x", "z")));
const symmetric = forall(["x", "y"], implies(R("x", "y"), R("y", "x")));
const total = forall(["x", "y"], or(R("x", "y"), R("y", "x"), equal("x", "y")));
const serial = forall("x", exists("y", R("x", "y")));
const order = theoryFrom({ irreflexive, transitive });

const model = checkFinite(
  theoryFrom({ transitive, serial, irr: exists("x", not(R("x", "x"))) }),
  unwatchedWork,
);

const evidences: Readonly<Record<string, Evidence | null>> = {
  entails: askEntails(order, total, unwatchedWork).evidence,
  "does-not-entail": askDoesNotEntail(order, symmetric, unwatchedWork).evidence,
  consistent: askConsistent(order, unwatchedWork).evidence,
  "infinite-only": askInfiniteOnly(order, unwatchedWork).evidence,
  independent: askIndependent(order, unwatchedWork).evidence,
  equivalent: askEquivalent(order, theoryFrom({ total }), unwatchedWork).evidence,
  "true-in": askTruth("true-in", model.model!, serial, unwatchedWork).evidence,
  "check-finite": model.evidence,
  independence: askIndependence(theoryFrom({ symmetric, transitive, serial }), unwatchedWork).evidence,
  compare: compareTheories(
    [
      { name: "Order", theory: order },
      { name: "Total", theory: theoryFrom({ total }) },
      { name: "Symmetric", theory: theoryFrom({ symmetric }) },
    ],
    unwatchedWork,
  ).evidence,
  dualise: askDuals("Serial", theoryFrom({ serial }), unwatchedWork).evidence,
  models: findModels(order, 3, unwatchedWork).evidence,
};

describe("evidence that a question gives", () => {
  it.each(Object.keys(evidences))("%s is accepted, also after a way through JSON", (name) => {
    expect(evidences[name]).not.toBeNull();
    expect(checkEvidence(JSON.parse(JSON.stringify(evidences[name])))).toMatchObject({ accepted: true });
  });
});

/** All copies of a value with one leaf, key or list member changed. */
function* changes(value: unknown): Generator<unknown> {
  if (Array.isArray(value)) {
    for (const [index, member] of value.entries()) {
      for (const changed of changes(member)) yield value.with(index, changed);
      yield value.toSpliced(index, 1);
      yield value.toSpliced(index, 0, member);
    }
    yield [];
  } else if (typeof value === "object" && value !== null) {
    for (const [key, member] of Object.entries(value)) {
      for (const changed of changes(member)) yield { ...value, [key]: changed };
      const { [key]: _, ...rest } = value as Record<string, unknown>;
      yield rest;
    }
    yield { ...value, foreign: 1 };
  } else if (typeof value === "number") yield* [value + 1, value - 1, 0.5, null, `${value}`];
  else if (typeof value === "string") {
    const words = [
      "x",
      "y",
      "R",
      "forall",
      "exists",
      "and",
      "or",
      "not",
      "holds",
      "fails",
      "finite",
      "independent",
    ];
    const more = ["incomparable", "different", "open", "entails", "consistent", "", 1];
    yield* [...words, ...more].filter((word) => word !== value);
  } else yield "something";
}

function interpretationOf(record: StructureRecord): Interpretation {
  const { size } = record.carrier;
  return new Map(
    Object.entries(record.tables).map(([name, { places, holds }]) => [
      name,
      new Set(
        holds.map((kind) =>
          Array.from(
            { length: places },
            (_, place) => Math.floor(kind / size ** (places - 1 - place)) % size,
          ).join(),
        ),
      ),
    ]),
  );
}

/** Whether evidence about entailment, models and finiteness is right, by brute force and the meaning of the words. */
function isRight(evidence: Evidence, formulas: readonly Formula[]): boolean {
  const { question, verdict, facts } = evidence;
  const truth = (record: StructureRecord, index: number) =>
    isTrue(formulas[index]!, record.carrier.size, interpretationOf(record));
  const separated = (model: readonly number[], other: readonly number[]) =>
    facts.some(
      ({ structure }) =>
        model.every((index) => truth(structure, index)) && other.some((index) => !truth(structure, index)),
    );
  const others = (axioms: readonly number[], place: number) => axioms.filter((_, index) => index !== place);
  switch (question.ask) {
    case "entails":
      return verdict === "fails" && separated(question.premises, [question.conclusion]);
    case "does-not-entail":
      return verdict === "holds" && separated(question.premises, [question.conclusion]);
    case "consistent":
    case "check-finite":
    case "infinite-only":
    case "no-finite-model": {
      const word = { consistent: "holds", "check-finite": "finite" }[question.ask as string] ?? "fails";
      const isModel = (record: StructureRecord) => question.axioms.every((index) => truth(record, index));
      return verdict === word && facts.some(({ structure }) => isModel(structure));
    }
    case "equivalent":
      return (
        verdict === "fails" &&
        (separated(question.left, question.right) || separated(question.right, question.left))
      );
    case "weaker":
      return verdict === "fails" && separated(question.right, question.left);
    case "independent":
      return (
        verdict === "holds" &&
        question.axioms.every((axiom, place) => separated(others(question.axioms, place), [axiom]))
      );
    case "true-in":
    case "false-in": {
      const value = truth(question.structure, question.sentence);
      return verdict === (value === (question.ask === "true-in") ? "holds" : "fails");
    }
    case "independence":
      return (verdict as string[]).every(
        (word, place) =>
          word === "open" ||
          (word === "independent" && separated(others(question.axioms, place), [question.axioms[place]!])),
      );
    case "models":
      return (
        verdict === null &&
        facts.every((fact) => question.axioms.every((axiom) => truth(fact.structure, axiom)))
      );
    case "compare":
    case "dualise": {
      const pairs = question.theories.flatMap((left, i) =>
        question.theories.slice(i + 1).map((right) => [left, right] as const),
      );
      return (verdict as string[]).every((word, place) => {
        const [left, right] = pairs[place]!;
        if (word === "incomparable") return separated(left, right) && separated(right, left);
        if (word === "different") return separated(left, right) || separated(right, left);
        return word === "open";
      });
    }
  }
}

describe("changed evidence", () => {
  it.each(Object.keys(evidences))("%s: whatever is wrong after a change is rejected", (name) => {
    let rejected = 0;
    for (const changed of changes(evidences[name]) as Generator<Evidence>) {
      expect(
        checkEvidence(changed).accepted && changed.digest !== digestOf(changed.sentences, changed.question),
      ).toBe(false);
      // With the digest made to fit again, the content itself must be wrong.
      const { sentences, question } = changed;
      const fitting =
        sentences === undefined || question === undefined
          ? changed
          : { ...changed, digest: digestOf(sentences, question) };
      if (!checkEvidence(fitting).accepted) {
        rejected += 1;
        continue;
      }
      const { evidence, formulas } = readEvidence(fitting);
      if (!isRight(evidence, formulas)) expect.fail(`accepted though wrong: ${JSON.stringify(fitting)}`);
    }
    expect(rejected).toBeGreaterThan(50);
  });
});

describe("foreign and hostile evidence is refused with the reason", () => {
  const good = JSON.parse(JSON.stringify(evidences.entails)) as Record<string, unknown>;
  let deep: unknown = ["true"];
  for (let level = 0; level < 100_000; level += 1) deep = ["not", deep];
  it.each<[string, unknown, RegExp]>([
    ["nothing", null, /not an object/],
    ["a text", "evidence", /not an object/],
    ["another format", { ...good, format: "other" }, /not Twoplace evidence/],
    ["another version", { ...good, version: 2 }, /version 2/],
    ["a missing key", { ...good, facts: undefined, verdict: "fails" }, /facts/],
    ["a foreign key", { ...good, comment: "trust me" }, /foreign key "comment"/],
    ["a free variable", { ...good, sentences: [["is", "R", "x", "x"]] }, /free variable x/],
    ["a deep formula", { ...good, sentences: [deep] }, /nested more than/],
  ])("%s", (_, evidence, reason) => {
    const result = checkEvidence(evidence);
    expect(result.accepted).toBe(false);
    if (!result.accepted) expect(result.reason).toMatch(reason);
  });

  it("a domain beyond what can be evaluated", () => {
    const text = JSON.stringify(good).replace(/"size":\d+/, '"size":1000000000000');
    const result = checkEvidence(JSON.parse(text));
    expect(result).toMatchObject({ accepted: false });
  });
});
