/**
 * All turns on random sentences: what one derives the checker accepts, and neither another turn nor a structure on one
 * or two points says the opposite.
 */
import fc from "fast-check";
import { describe, expect, it } from "vitest";
import { Points } from "../lib/carriers/points.ts";
import { type DerivationTask, prepareTurn, runTurn, type TurnOutcome } from "../lib/derivation/derive.ts";
import { ENDLESS_TURNS, TURNS, turnsOf } from "../lib/derivation/schedule.ts";
import { checkEvidence } from "../lib/evidence/check.ts";
import { EvidenceWriter } from "../lib/inquiry/evidence-writer.ts";
import { not } from "../lib/logic/formula.ts";
import { Meter, WorkEnded } from "../lib/logic/meter.ts";
import { Solver } from "../lib/structures/sat/solver.ts";
import { findStructure } from "../lib/structures/search.ts";
import { sentences } from "./support/random-formulas.ts";

const seed = Number(process.env.TWOPLACE_SEED ?? 20261204);
const relations = [
  { name: "R", places: 2, infix: false },
  { name: "S", places: 1, infix: false },
];
/** Clauses for each turn. */
const CLAUSES = 150;

function outcomesOf(task: DerivationTask): TurnOutcome["result"][] {
  const results: TurnOutcome["result"][] = [];
  for (const plan of [...TURNS, ...ENDLESS_TURNS])
    for (const turn of turnsOf({ ...plan, clauses: Math.min(plan.clauses, CLAUSES) }, task)) {
      const prepared = prepareTurn(task, turn.preparation);
      if (prepared === null) continue;
      try {
        const outcome = runTurn(
          task,
          turn,
          prepared,
          new Meter(2 * CLAUSES),
          (onDerived) => new Solver({ observer: { onDerived } }),
        );
        results.push(outcome.result);
        if (outcome.result !== "derived") continue;
        const writer = new EvidenceWriter();
        const premises = writer.theory(task.premises);
        const question = { ask: "entails" as const, premises, conclusion: writer.sentence(task.conclusion!) };
        writer.addDerivation(task, outcome.derivation);
        const evidence = writer.finish(question, "holds");
        expect(checkEvidence(JSON.parse(JSON.stringify(evidence))), plan.name).toMatchObject({
          accepted: true,
        });
      } catch (problem) {
        if (!(problem instanceof WorkEnded)) throw problem;
      }
    }
  return results;
}

describe("random questions", () => {
  it(`have the same answer by every turn, and by small structures (seed ${seed})`, () => {
    let derived = 0;
    let saturated = 0;
    fc.assert(
      fc.property(
        fc.array(sentences(relations, 3), { minLength: 0, maxLength: 2 }),
        sentences(relations, 2),
        (premises, conclusion) => {
          const results = outcomesOf({ premises, conclusion });
          const isDerived = results.includes("derived");
          expect(isDerived && results.includes("saturated")).toBe(false);
          if (isDerived) derived += 1;
          if (results.includes("saturated")) saturated += 1;
          const countermodel = [1, 2].some((size) => {
            const task = { carrier: new Points(size), sentences: [...premises, not(conclusion)], relations };
            return findStructure(task, new Meter(2_000)).result === "found";
          });
          expect(isDerived && countermodel).toBe(false);
        },
      ),
      { seed, numRuns: 1000, verbose: 1 },
    );
    expect(derived).toBeGreaterThan(50);
    expect(saturated).toBeGreaterThan(50);
  });
});
