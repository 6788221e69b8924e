/**
 * Theories with finite models from 6 to 12 points on, and contradictory ones, are never said to have no finite model. Each
 * family has its source beside it in tests/support/large-finite.ts.
 */
import fc from "fast-check";
import { describe, expect, it } from "vitest";
import { checkFinite } from "../lib/inquiry/check-finite.ts";
import { unwatchedWork } from "../lib/inquiry/work.ts";
import { DEFAULT_BUDGET, Meter } from "../lib/logic/meter.ts";
import { sentencesOf } from "../lib/logic/theory.ts";
import { satisfiesAll } from "../lib/structures/evaluate.ts";
import { largeFinite } from "./support/large-finite.ts";

const seed = Number(process.env.TWOPLACE_SEED ?? 20261201);
const sets = 300;
/** For the theories that have a finite model; with the default budget they take half an hour. */
const short = process.env.TWOPLACE_LONG === "1" ? DEFAULT_BUDGET : 2_000;

describe(`${sets} theories that are inconsistent or have finite models from 6 points on (seed ${seed})`, () => {
  const examples = fc.sample(largeFinite, { numRuns: sets, seed });

  it("have the model they are said to have", () => {
    for (const { name, theory, model } of examples)
      if (model !== null)
        expect(satisfiesAll(model, sentencesOf(theory), new Meter(Number.POSITIVE_INFINITY)), name).toBe(
          true,
        );
    expect(examples.filter(({ model }) => model === null).length).toBeGreaterThan(50);
    expect(examples.filter(({ model }) => model !== null).length).toBeGreaterThan(150);
  });

  // Numbers only: the runner would write whole theories and structures into the names of tests.
  it.each([...examples.keys()])("%i", (number) => {
    const { name, theory, model } = examples[number]!;
    const budget = model === null ? DEFAULT_BUDGET : short;
    const answer = checkFinite(theory, { ...unwatchedWork, budget, symmetricUpTo: 12 });
    expect(model === null ? ["inconsistent", "open"] : ["finite", "consistent", "open"], name).toContain(
      answer.verdict,
    );
    if (answer.leastSize !== null) expect(answer.leastSize, name).toBeGreaterThanOrEqual(6);
  });
});
