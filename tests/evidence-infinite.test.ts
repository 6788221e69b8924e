/**
 * The checker on infinite structures, free terms and reasons why there is no finite model: it accepts what the searches
 * produce, rejects what is wrong after a change in any place, and refuses hostile evidence at once. The judge of changed
 * evidence shares nothing with the checker.
 */
import fc from "fast-check";
import { describe, expect, it } from "vitest";
import { checkEvidence } from "../lib/evidence/check.ts";
import { digestOf } from "../lib/evidence/digest.ts";
import { isTrueIn } from "../lib/evidence/evaluate.ts";
import type {
  Evidence,
  Fact,
  FormulaRecord,
  StructureRecord,
  TheoryQuestion,
} from "../lib/evidence/format.ts";
import { checkFinite } from "../lib/inquiry/check-finite.ts";
import { unwatchedWork } from "../lib/inquiry/work.ts";
import { Meter, WorkEnded } from "../lib/logic/meter.ts";
import { recordFormula } from "../lib/logic/records/formulas.ts";
import { composites, finite, nameOf, ofAllKinds } from "./support/carriers-composites.ts";
import { readTheory } from "./support/corpora.ts";
import { isRight } from "./support/evidence-judge.ts";
import {
  type Attack,
  attack,
  evidenceOfAllQuestions,
  expectEvidence,
  finitenessEvidence,
  structuresIn,
  truthEvidence,
} from "./support/infinite-evidence.ts";
import { isTrueInfinite } from "./support/infinite-judge.ts";
import { sentences } from "./support/random-formulas.ts";

const seed = Number(process.env.TWOPLACE_SEED ?? 20261201);

/** One of each kind of infinite structure, with each kind of reason. */
const SETS = ["io-03", "io-27", "io-33", "io-43", "io-47", "io-69", "io-73", "io-75"];
const evidences: Readonly<Record<string, Evidence>> = {
  ...evidenceOfAllQuestions(),
  ...Object.fromEntries(SETS.map((id) => [id, finitenessEvidence(id)])),
};
const carriers = [...ofAllKinds, ...finite];

function expectRejections({ tried, accepted, wrong }: Attack): void {
  if (wrong.length > 0) expect.fail(`accepted though wrong: ${JSON.stringify(wrong[0])}`);
  expect(tried).toBeGreaterThan(20);
  expect(accepted).toBeLessThan(tried / 3);
}

describe("evidence with infinite structures and reasons", () => {
  it.each(Object.keys(evidences))("%s is accepted", (name) => {
    const evidence = evidences[name]!;
    expect(checkEvidence(evidence)).toMatchObject({ accepted: true });
    expect(isRight(evidence, structuresIn(evidence))).toBe(true);
  });

  it.each(Object.keys(evidences))("%s: whatever is wrong after a change is rejected", (name) => {
    expectRejections(attack(evidences[name]!, { others: 23, derivations: 499 }));
  });

  it.each(carriers.map((carrier, number) => [nameOf(carrier), number] as const))(
    "what is true on %s: accepted, and rejected when it is changed",
    (_, number) => {
      const evidence = truthEvidence(carriers[number]!, number);
      expect(checkEvidence(evidence)).toMatchObject({ accepted: true });
      expect(isRight(evidence)).toBe(true);
      expectRejections(attack(evidence, { others: 37, derivations: 1 }));
    },
  );
});

describe("what facts bear out", () => {
  const both = evidences["io-03"]!;
  const ofTerms = evidences["io-47"]!;
  const isModel = ({ fact }: Fact) => fact === "structure" || fact === "terms";
  const finite = expectEvidence(checkFinite(readTheory(["exists x y. R(x,y)"]), unwatchedWork).evidence);
  const contradiction = expectEvidence(
    checkFinite(readTheory(["exists x. R(x,x)", "forall x. ~R(x,x)"]), unwatchedWork).evidence,
  );
  const words = [
    ...["holds", "fails", "open", "finite", "inconsistent", "consistent", "infinite-only", "no-finite-model"],
    ...["equivalent", "constructor", ""],
  ];

  it.each<[string, Evidence, (fact: Fact) => boolean, Readonly<Record<string, readonly string[]>>]>([
    ["a model and a reason", both, () => true, { "check-finite": ["consistent", "infinite-only", "no-finite-model"], "infinite-only": ["holds"], "no-finite-model": ["holds"], consistent: ["holds"] }],
    ["a model of terms and a reason", ofTerms, () => true, { "check-finite": ["consistent", "infinite-only", "no-finite-model"], "infinite-only": ["holds"], "no-finite-model": ["holds"], consistent: ["holds"] }],
    ["an infinite model", both, isModel, { "check-finite": ["consistent"], "infinite-only": [], "no-finite-model": [], consistent: ["holds"] }],
    ["a model of terms", ofTerms, isModel, { "check-finite": ["consistent"], "infinite-only": [], "no-finite-model": [], consistent: ["holds"] }],
    ["a reason", both, (fact) => !isModel(fact), { "check-finite": ["no-finite-model"], "infinite-only": [], "no-finite-model": ["holds"], consistent: [] }],
    ["derivations alone", both, ({ fact }) => fact === "derivation", { "check-finite": [], "infinite-only": [], "no-finite-model": [], consistent: [] }],
    ["nothing", both, () => false, { "check-finite": [], "infinite-only": [], "no-finite-model": [], consistent: [] }],
    ["a finite model", finite, () => true, { "check-finite": ["finite", "consistent"], "infinite-only": ["fails"], "no-finite-model": ["fails"], consistent: ["holds"] }],
    ["a contradiction", contradiction, () => true, { "check-finite": ["inconsistent"], "infinite-only": ["fails"], "no-finite-model": ["holds"], consistent: ["fails"] }],
  ])("%s: these verdicts and no others", (_, evidence, isKept, expected) => {
    const { sentences, facts } = evidence;
    const { axioms } = evidence.question as { readonly axioms: readonly number[] };
    for (const [ask, verdicts] of Object.entries(expected)) {
      const accepted = words.filter((verdict) => {
        const question = { ask: ask as TheoryQuestion, axioms };
        const changed = { ...evidence, question, verdict, facts: facts.filter(isKept) };
        return checkEvidence({ ...changed, digest: digestOf(sentences, question) }).accepted;
      });
      expect(accepted.sort(), ask).toEqual([...verdicts].sort());
    }
  }); // biome-ignore format: a row each

  it.each([both, ofTerms])("of a model that is said to be one of fewer axioms: none", (evidence) => {
    const { question } = evidence;
    const facts = evidence.facts.filter(isModel).map((fact): Fact => {
      if (fact.fact === "structure") return { ...fact, holds: fact.holds.slice(1) };
      if (fact.fact !== "terms") return fact;
      return { ...fact, holds: fact.holds.slice(1), certificates: fact.certificates.slice(1) };
    });
    expect(checkEvidence({ ...evidence, facts, verdict: "consistent" })).toMatchObject({
      accepted: false,
      reason: expect.stringMatching(/do not bear out/),
    });
    const whole = evidence.facts.filter(isModel);
    expect(checkEvidence({ ...evidence, question, facts: whole, verdict: "consistent" }).accepted).toBe(true);
  });

  it("of a theory with more axioms than the reason needs, and not with fewer", () => {
    const { sentences } = both;
    const more: FormulaRecord = ["exists", "x", ["true"]];
    const check = (axioms: readonly number[]) => {
      const question = { ask: "no-finite-model" as const, axioms };
      const all = [...sentences, more];
      const facts = both.facts.filter((fact) => !isModel(fact));
      const changed = { ...both, sentences: all, question, verdict: "holds", facts };
      return checkEvidence({ ...changed, digest: digestOf(all, question) }).accepted;
    };
    const { axioms } = both.question as { readonly axioms: readonly number[] };
    expect(check([...axioms, sentences.length])).toBe(true);
    expect(check([sentences.length])).toBe(false);
    expect(check([])).toBe(false);
  });
});

describe(`truth on infinite carriers (seed ${seed})`, () => {
  it("is what walking over true elements finds", () => {
    const relation = { name: "R", places: 2, infix: false };
    const lines = [...composites, ...ofAllKinds.slice(composites.length, composites.length + 5)];
    let compared = 0;
    fc.assert(
      fc.property(fc.constantFrom(...lines), fc.nat(), sentences([relation], 1), (carrier, number, said) => {
        const { question } = truthEvidence(carrier, number);
        const { structure } = question as { readonly structure: StructureRecord };
        const sentence = recordFormula(said);
        try {
          const value = isTrueIn(structure, sentence, new Meter(20));
          expect(value).toBe(isTrueInfinite(structure, sentence));
          compared += 1;
        } catch (problem) {
          if (!(problem instanceof WorkEnded)) throw problem;
        }
      }),
      { seed, numRuns: 300, verbose: 1 },
    );
    expect(compared).toBeGreaterThan(200);
  });
});
