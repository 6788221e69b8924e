/** Derivations by way of the complements: what is found there is a derivation of what was asked. */
import { describe, expect, it } from "vitest";
import { complementOutcome, complementTask } from "../lib/derivation/complement.ts";
import { type DerivationTask, prepareTurn, runTurn } from "../lib/derivation/derive.ts";
import { CAREFUL_STRATEGY, TERSE_STRATEGY } from "../lib/derivation/saturation/strategy.ts";
import { checkEvidence } from "../lib/evidence/check.ts";
import { EvidenceWriter } from "../lib/inquiry/evidence-writer.ts";
import { Meter } from "../lib/logic/meter.ts";
import { complementFormula } from "../lib/logic/theory.ts";
import { Solver } from "../lib/structures/sat/solver.ts";
import { claims, questions, readSentences } from "./support/corpora.ts";

const preparation = { unfold: true, miniscope: false, letters: "none", mostClauses: 32 } as const;

function run(task: DerivationTask, strategy = TERSE_STRATEGY, complemented = true) {
  const engine = complemented
    ? ({ by: "saturation", strategy, complemented } as const)
    : ({ by: "saturation", strategy } as const);
  const turn = {
    engine,
    preparation: { ...preparation, premises: task.premises.map((_, place) => place) },
    clauses: 300,
  };
  const prepared = prepareTurn(task, turn.preparation)!;
  const meter = new Meter(1_000);
  const outcome = runTurn(
    task,
    turn,
    prepared,
    meter,
    (onDerived) => new Solver({ observer: { onDerived } }),
  );
  return { outcome, steps: meter.steps };
}

const tasks = [...claims, ...questions].map((entry) => {
  const [conclusion, ...premises] = readSentences([entry.conclusion, ...entry.premises]);
  return { id: entry.id, expected: entry.expected, task: { premises, conclusion: conclusion! } };
});

describe("the entailments of claims.json and questions.json by way of the complements", () => {
  it("what is derived holds, and the checker accepts it", () => {
    let derived = 0;
    for (const { id, expected, task } of tasks)
      for (const strategy of [TERSE_STRATEGY, CAREFUL_STRATEGY]) {
        const { outcome } = run(task, strategy);
        if (outcome.result !== "derived") continue;
        derived += 1;
        expect([id, expected]).toEqual([id, "holds"]);
        const writer = new EvidenceWriter();
        const [premises, conclusion] = [writer.theory(task.premises), writer.sentence(task.conclusion)];
        writer.addDerivation(task, outcome.derivation);
        const evidence = writer.finish({ ask: "entails", premises, conclusion }, "holds");
        expect(checkEvidence(JSON.parse(JSON.stringify(evidence)))).toMatchObject({ accepted: true });
      }
    expect(derived).toBeGreaterThan(300);
  });

  it("they cost what the complements cost by the straight way", () => {
    let compared = 0;
    for (const { id, expected, task } of tasks) {
      if (expected !== "holds" || id.startsWith("q-")) continue;
      // The claims are about R alone, and no premise defines it.
      const complement = {
        premises: task.premises.map(complementFormula),
        conclusion: complementFormula(task.conclusion),
      };
      const [there, straight] = [run(complement), run(task, TERSE_STRATEGY, false)];
      expect([id, there.outcome.result, there.steps]).toEqual([id, straight.outcome.result, straight.steps]);
      compared += 1;
    }
    expect(compared).toBeGreaterThan(50);
  });
});

describe("complements of clauses", () => {
  const literal = ["is", "R", "x"] as const;
  const same = ["=", "x", "y"] as const;
  const input = {
    clause: [literal, ["not", literal], same, ["not", same]],
    ...{ formula: 0, place: 0, goal: false },
  } as const;

  it("leave identity as it is, and are taken back by themselves", () => {
    const task = { clauses: [input], formulas: 1 };
    expect(complementTask(task).clauses[0]!.clause).toEqual([["not", literal], literal, same, ["not", same]]);
    expect(complementTask(complementTask(task))).toEqual(task);
  });

  it("of a refutation that defines relations are refused", () => {
    const refutation = { definitions: [{ name: "d1", parameters: [], body: ["true"] as const }], steps: [] };
    expect(() => complementOutcome({ result: "refuted", refutation })).toThrow("must not split");
    expect(complementOutcome({ result: "saturated" })).toEqual({ result: "saturated" });
  });
});
