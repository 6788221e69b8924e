/**
 * The checker on infinite structures, free terms and reasons why there is no finite model: it accepts what the searches
 * produce, rejects what is wrong after a change in any place, and refuses hostile evidence at once. The judge of changed
 * evidence shares nothing with the checker.
 */
import fc from "fast-check";
import { describe, expect, it } from "vitest";
import { checkEvidence } from "../lib/evidence/check.ts";
import { isTrueIn } from "../lib/evidence/evaluate.ts";
import type { Evidence, StructureRecord } from "../lib/evidence/format.ts";
import { Meter, WorkEnded } from "../lib/logic/meter.ts";
import { recordFormula } from "../lib/logic/records/formulas.ts";
import { composites, finite, nameOf, ofAllKinds } from "./support/carriers-composites.ts";
import { isRight } from "./support/evidence-judge.ts";
import {
  type Attack,
  attack,
  evidenceOfAllQuestions,
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
