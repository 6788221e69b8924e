/**
 * The checker: accepts what the searches produce, and rejects every change that makes it wrong. Whether changed
 * evidence is still right is judged by brute force, which shares nothing with the checker.
 */
import { describe, expect, it } from "vitest";
import { checkEvidence } from "../lib/evidence/check.ts";
import { digestOf } from "../lib/evidence/digest.ts";
import type { Evidence, Fact, TheoryRecord, VerdictRecord } from "../lib/evidence/format.ts";
import { checkFinite } from "../lib/inquiry/check-finite.ts";
import {
  askConsistent,
  askDoesNotEntail,
  askEntails,
  askEquivalent,
  askIndependent,
  askInfiniteOnly,
  askNoFiniteModel,
  askTruth,
  askWeaker,
} from "../lib/inquiry/claims.ts";
import { compareTheories } from "../lib/inquiry/compare.ts";
import { askDuals } from "../lib/inquiry/dualise.ts";
import { askIndependence } from "../lib/inquiry/independence.ts";
import { minimise } from "../lib/inquiry/minimise.ts";
import { findModels } from "../lib/inquiry/models.ts";
import { unwatchedWork } from "../lib/inquiry/work.ts";
import { and, atom, equal, exists, forall, implies, not, or } from "../lib/logic/formula.ts";
import { changes } from "./support/changes.ts";
import { isRight } from "./support/evidence-judge.ts";
import { onCarrier } from "./support/structures.ts";
import { theoryFrom } from "./support/theories.ts";

const R = (x: string, y: string) => atom({ name: "R", places: 2, infix: false }, x, y);
const irreflexive = forall("x", not(R("x", "x")));
const transitive = forall(["x", "y", "z"], implies(and(R("x", "y"), R("y", "z")), R("x", "z")));
const symmetric = forall(["x", "y"], implies(R("x", "y"), R("y", "x")));
const total = forall(["x", "y"], or(R("x", "y"), R("y", "x"), equal("x", "y")));
const serial = forall("x", exists("y", R("x", "y")));
const asymmetric = forall(["x", "y"], implies(R("x", "y"), not(R("y", "x"))));
const order = theoryFrom({ irreflexive, transitive });
const asymmetricOrder = theoryFrom({ asymmetric, transitive });
const redundant = theoryFrom({ irreflexive, transitive, asymmetric });
const contradictory = theoryFrom({ asymmetric, loop: exists("x", R("x", "x")) });

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
  "true-in": askTruth("true-in", onCarrier(model.model), serial, unwatchedWork).evidence,
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
  "entails, derived": askEntails(order, asymmetric, unwatchedWork).evidence,
  "does not entail, derived": askDoesNotEntail(order, asymmetric, unwatchedWork).evidence,
  "consistent, derived": askConsistent(contradictory, unwatchedWork).evidence,
  "check-finite, derived": checkFinite(contradictory, unwatchedWork).evidence,
  "no finite model, derived": askNoFiniteModel(contradictory, unwatchedWork).evidence,
  "weaker, derived": askWeaker(theoryFrom({ irreflexive }), order, unwatchedWork).evidence,
  "not weaker, derived": askWeaker(order, theoryFrom({ irreflexive }), unwatchedWork).evidence,
  "equivalent, derived": askEquivalent(order, asymmetricOrder, unwatchedWork).evidence,
  "not independent, derived": askIndependent(redundant, unwatchedWork).evidence,
  "independence, derived": askIndependence(redundant, unwatchedWork).evidence,
  "compare, derived": compareTheories(
    [
      { name: "Order", theory: order },
      { name: "Asymmetric", theory: theoryFrom({ asymmetric }) },
      { name: "Other", theory: asymmetricOrder },
    ],
    unwatchedWork,
  ).evidence,
  "dualise, derived": askDuals("Order", order, unwatchedWork).evidence,
  minimise: minimise(redundant, unwatchedWork).evidence,
  "no models": findModels(theoryFrom({ irreflexive, transitive, serial }), 3, unwatchedWork).evidence,
};

describe("evidence that a question gives", () => {
  it.each(Object.keys(evidences))("%s is accepted, also after a way through JSON", (name) => {
    expect(evidences[name]).not.toBeNull();
    expect(checkEvidence(JSON.parse(JSON.stringify(evidences[name])))).toMatchObject({ accepted: true });
  });
});

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
      if (!isRight(fitting)) expect.fail(`accepted though wrong: ${JSON.stringify(fitting)}`);
    }
    expect(rejected).toBeGreaterThan(50);
  });
});

describe("all irredundant sets of axioms", () => {
  // Of a strict order given by irreflexive (0), transitive (1) and asymmetric (2), 0 or 2 is enough beside 1.
  const certified = evidences.minimise!;
  /** Without what shows that there are no others. */
  const known: Evidence = {
    ...certified,
    verdict: (certified.verdict as string[]).slice(1),
    facts: certified.facts.filter((fact) => fact.fact !== "structure" || fact.fails?.length !== 3),
  };
  const structure = (
    size: number,
    holds: readonly number[],
    facts: TheoryRecord,
    fails: TheoryRecord,
  ): Fact => ({
    fact: "structure",
    structure: { carrier: { kind: "points", size }, tables: { R: { places: 2, holds } } },
    holds: facts,
    fails,
  });
  // 1 before 2 before 3, but not 1 before 3; and a point before itself.
  const weak = [structure(3, [1, 5], [0, 2], [1]), structure(1, [0], [1], [0, 2])];
  const withMore = (verdict: VerdictRecord, facts: readonly Fact[]) =>
    checkEvidence({ ...known, verdict, facts: [...known.facts, ...facts] }).accepted;

  it("are known to be all by structures for the sets that are too weak", () => {
    expect(certified.verdict).toEqual(["complete", "0,1", "1,2"]);
    expect(known.verdict).toEqual(["0,1", "1,2"]);
    expect(checkEvidence(known).accepted).toBe(true);
    expect(withMore(["complete", "0,1", "1,2"], weak)).toBe(true);
    expect(isRight({ ...known, verdict: ["complete", "0,1", "1,2"], facts: [...known.facts, ...weak] })).toBe(
      true,
    );
  });

  it.each<[string, VerdictRecord, readonly Fact[]]>([
    ["one set left out", ["complete", "0,1"], weak],
    ["no set", ["complete"], weak],
    ["a structure left out", ["complete", "0,1", "1,2"], weak.slice(1)],
    ["a set twice", ["complete", "0,1", "1,2", "1,2"], weak],
    ["a set that is not irredundant", ["complete", "0,1", "1,2", "0,1,2"], weak],
    ["a set that is too weak", ["0,2"], weak],
    ["places in another order", ["1,0"], weak],
    ["places that there are not", ["1,3"], weak],
    ["a place twice", ["1,1"], weak],
    ["no numbers", ["first"], weak],
    ["a word", "complete", weak],
  ])("%s", (_, verdict, facts) => {
    expect(withMore(verdict, facts)).toBe(false);
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

  it.each<[string, () => Record<string, unknown>]>([
    ["many facts", () => ({ ...good, facts: Array(20_000).fill((good.facts as unknown[])[0]) })],
    ["many words", () => ({ ...good, verdict: Array(200_000).fill("open") })],
    [
      "a premise again and again",
      () => ({ ...good, question: { ask: "entails", premises: Array(100_000).fill(0), conclusion: 1 } }),
    ],
    [
      "a theory again and again",
      () => ({ ...good, question: { ask: "compare", theories: Array(500).fill([0, 1]) } }),
    ],
    ["a wide formula", () => ({ ...good, sentences: [["and", ...Array(200_000).fill(["true"])], ["true"]] })],
    ["names of JavaScript", () => ({ ...good, question: { ask: "constructor", axioms: [] } })],
    ["a fact of a kind of JavaScript", () => ({ ...good, facts: [{ fact: "toString" }] })],
    [
      "a relation of JavaScript",
      () => ({ ...good, sentences: [["exists", "x", ["is", "constructor", "x"]], ["true"]] }),
    ],
  ])("%s", (_, make) => {
    const evidence = make() as unknown as Evidence;
    const { sentences, question } = evidence;
    expect(checkEvidence({ ...evidence, digest: digestOf(sentences, question) }).accepted).toBe(
      evidence.facts.length === 20_000,
    );
  });

  it("tuples that the structure does not have", () => {
    const changed = JSON.parse(
      JSON.stringify(good).replace(/"holds":\[[^\]]*\],?(?=\}\})/, '"holds":[1000000]'),
    );
    expect(JSON.stringify(changed)).toContain("[1000000]");
    expect(checkEvidence(changed)).toMatchObject({
      accepted: false,
      reason: expect.stringMatching(/not kinds here/),
    });
  });

  it("a domain beyond what can be evaluated", () => {
    const text = JSON.stringify(good).replace(/"size":\d+/, '"size":1000000000000');
    const result = checkEvidence(JSON.parse(text));
    expect(result).toMatchObject({ accepted: false });
  });
});
