/**
 * The checker on all 42 sets with only infinite models, on all questions with only infinite countermodels, on every kind of
 * question and every kind of carrier: evidence is changed nearly everywhere, and what is wrong then is rejected.
 */
import { afterAll, describe, expect, it } from "vitest";
import { checkEvidence } from "../lib/evidence/check.ts";
import type { Evidence } from "../lib/evidence/format.ts";
import { Meter } from "../lib/logic/meter.ts";
import { finite, nameOf, ofAllKinds } from "./support/carriers-composites.ts";
import { infiniteOnly } from "./support/corpora.ts";
import { isRight } from "./support/evidence-judge.ts";
import {
  type Attack,
  attack,
  attackByExchange,
  countermodelEvidence,
  evidenceOfAllQuestions,
  finitenessEvidence,
  infiniteQuestions,
  type Rates,
  structuresIn,
  truthEvidence,
} from "./support/infinite-evidence.ts";

const seed = Number(process.env.TWOPLACE_SEED ?? 20261201);
const random = randomFrom(seed);
const total = { tried: 0, accepted: 0 };

/** Numbers from 0 to below 1, the same for the same seed (a linear congruential generator). */
function randomFrom(start: number): () => number {
  let state = start >>> 0;
  return () => {
    state = (Math.imul(state, 1664525) + 1013904223) >>> 0;
    return state / 2 ** 32;
  };
}

/** Accepts the evidence, and changes it. */
function attackAll(evidence: Evidence, rates: Rates, exchanges: number): void {
  expect(checkEvidence(evidence)).toMatchObject({ accepted: true });
  expect(isRight(evidence, structuresIn(evidence))).toBe(true);
  const attacks: readonly Attack[] = [attack(evidence, rates), attackByExchange(evidence, exchanges, random)];
  for (const { tried, accepted, wrong } of attacks) {
    if (wrong.length > 0) expect.fail(`accepted though wrong: ${JSON.stringify(wrong[0])}`);
    expect(accepted).toBeLessThan(tried / 3);
    total.tried += tried;
    total.accepted += accepted;
  }
}

describe(`changed evidence (exchanged parts by seed ${seed})`, () => {
  it.each(infiniteOnly.map(({ id }) => id))("of set %s", (id) => {
    const evidence = finitenessEvidence(id);
    expect(evidence.verdict).toBe("infinite-only");
    // A question of a few hundred steps at least is checked in a few.
    const meter = new Meter(100);
    expect(checkEvidence(evidence, meter)).toMatchObject({ accepted: true });
    attackAll(evidence, { others: 8, derivations: 300 }, 100);
  });

  it.each(infiniteQuestions.map((question) => [question.id, question] as const))(
    "of the infinite countermodel for %s",
    (_, question) => {
      const evidence = countermodelEvidence(question);
      // At most two may stay open (the target).
      if (evidence !== null) attackAll(evidence, { others: 1, derivations: 1 }, 100);
    },
  );

  it.each(Object.entries(evidenceOfAllQuestions()))("of a question: %s", (_, evidence) => {
    attackAll(evidence, { others: 3, derivations: 60 }, 300);
  });

  it.each([...ofAllKinds, ...finite].map((carrier, number) => [nameOf(carrier), carrier, number] as const))(
    "of what is true on %s",
    (_, carrier, number) => attackAll(truthEvidence(carrier, number), { others: 1, derivations: 1 }, 100),
  );
});

afterAll(() => console.log(`${total.tried} changes, ${total.accepted} harmless ones accepted`));
