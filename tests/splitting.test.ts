/** Splitting of clauses: what it makes of a few sets, and that the checker accepts derivations with cases. */
import { describe, expect, it } from "vitest";
import { showDerivation } from "../kernel/display/derivations.ts";
import { blocksToText } from "../kernel/display/to-text.ts";
import { assemble } from "../lib/derivation/assemble.ts";
import type { DerivationTask } from "../lib/derivation/derive.ts";
import type { CreateSolver } from "../lib/derivation/ground-solver.ts";
import { prepare } from "../lib/derivation/prepare.ts";
import type { ClauseTask, EngineOutcome } from "../lib/derivation/refutation.ts";
import { saturate } from "../lib/derivation/saturation/saturate.ts";
import {
  DEFAULT_STRATEGY,
  SPLITTING_STRATEGY,
  type Strategy,
} from "../lib/derivation/saturation/strategy.ts";
import { checkEvidence } from "../lib/evidence/check.ts";
import type { AtomRecord, ClauseRecord, DerivationFact } from "../lib/evidence/format.ts";
import { EvidenceWriter } from "../lib/inquiry/evidence-writer.ts";
import { Meter, WorkEnded } from "../lib/logic/meter.ts";
import { Solver } from "../lib/structures/sat/solver.ts";
import { questions, readSentences } from "./support/corpora.ts";

const createSolver: CreateSolver = (onDerived) => new Solver({ observer: { onDerived } });
const LIMITS = { clauses: 3_000, literals: 1_000_000 };
const split: Strategy = { ...DEFAULT_STRATEGY, isSplit: true };

function run(task: ClauseTask, strategy = split, limits = LIMITS, meter = new Meter(1e6)): EngineOutcome {
  return saturate(task, strategy, limits, meter, createSolver);
}

function taskOf(clauses: readonly ClauseRecord[]): ClauseTask {
  return {
    clauses: clauses.map((clause, place) => ({ clause, formula: 0, place, goal: false })),
    formulas: 1,
  };
}

function questionOf(premises: readonly string[], conclusion: string): DerivationTask {
  const sentences = readSentences([...premises, conclusion]);
  return { premises: sentences.slice(0, -1), conclusion: sentences.at(-1)! };
}

/** A derivation by one run that splits, which the checker has accepted. */
function derive(task: DerivationTask, strategy = split) {
  const prepared = prepare(task, {
    premises: [...task.premises.keys()],
    unfold: true,
    miniscope: false,
    letters: "none",
    mostClauses: 32,
  });
  const outcome = run(prepared.task, strategy);
  if (outcome.result !== "refuted") throw new Error(outcome.result);
  const derivation = assemble(task, prepared, outcome.refutation);
  const writer = new EvidenceWriter();
  const premises = writer.theory(task.premises);
  const conclusion = writer.sentence(task.conclusion!);
  writer.addDerivation(task, derivation);
  const evidence = writer.finish({ ask: "entails", premises, conclusion }, "holds");
  expect(checkEvidence(JSON.parse(JSON.stringify(evidence)))).toMatchObject({ accepted: true });
  return { derivation, refutation: outcome.refutation };
}

const p = (relation: string, term: string): AtomRecord => ["is", relation, term];
const at = (relation: string, constant: string): AtomRecord => ["is", relation, [constant]];

describe("splitting", () => {
  it("gives the parts of a clause names, which the solver contradicts", () => {
    const outcome = run(
      taskOf([[p("P", "x"), p("Q", "y")], [["not", at("P", "0.0")]], [["not", at("Q", "0.1")]]]),
    );
    expect(outcome.result).toBe("refuted");
  });

  it("has one definition for a part and its renamings, and none for what is ground", () => {
    const outcome = run(
      taskOf([
        [["is", "R", "x", "y"], at("Q", "0.0")],
        [
          ["is", "R", "z", "x"],
          ["not", at("Q", "0.0")],
        ],
        [["not", ["is", "R", ["0.0"], ["0.0"]]]],
      ]),
    );
    if (outcome.result !== "refuted") throw new Error(outcome.result);
    const { definitions, steps } = outcome.refutation;
    expect(definitions).toHaveLength(1);
    const { name, parameters, body } = definitions[0]!;
    expect({ parameters, body }).toEqual({
      parameters: [],
      body: ["forall", "x0", ["forall", "x1", ["is", "R", "x0", "x1"]]],
    });
    const cases = steps.flatMap((step) => (step.from === "inference" ? [step.clause] : []));
    expect(cases).toContainEqual([at("Q", "0.0"), ["is", name]]);
    expect(cases).toContainEqual([
      ["not", at("Q", "0.0")],
      ["is", name],
    ]);
  });

  it("avoids names that occur", () => {
    const clauses: ClauseRecord[] = [
      [p("case1", "x"), p("case2", "y")],
      [["not", at("case1", "0.0")], p("case2", "y")],
      [["not", at("case2", "0.1")]],
    ];
    const outcome = run(taskOf(clauses));
    expect(outcome.result).toBe("refuted");
    if (outcome.result !== "refuted") return;
    for (const { name } of outcome.refutation.definitions) expect(["case1", "case2"]).not.toContain(name);
  });

  it("says saturated when a case is left, and only if nothing was left out", () => {
    const clauses: ClauseRecord[] = [
      [p("P", "x"), p("Q", "y")],
      [
        ["not", at("P", "0.0")],
        ["not", at("Q", "0.0")],
      ],
    ];
    expect(run(taskOf(clauses))).toEqual({ result: "saturated" });
    const serial: ClauseRecord[] = [
      [p("P", "x"), p("Q", "y")],
      [["not", p("P", "x")], ["is", "P", ["0.0", "x"]], p("Q", "z")],
      [["is", "S", ["0.0", ["0.0", ["0.1"]]]], p("P", "x")],
    ];
    expect(run(taskOf(serial))).toEqual({ result: "saturated" });
    expect(run(taskOf(serial), { ...split, mostDepth: 1 })).toEqual({
      result: "gave-up",
      reason: "incomplete",
    });
  });

  it("is refused without a solver", () => {
    expect(() => saturate(taskOf([]), split, LIMITS, new Meter())).toThrow("solver");
  });
});

const tournament = questionOf(
  [
    "forall x y (R(x,y) | R(y,x) | x=y)",
    "forall x ~R(x,x)",
    "forall x y ~(R(x,y) & R(y,x))",
    "exists a b c d (a!=b&a!=c&a!=d&b!=c&b!=d&c!=d&forall x (x=a|x=b|x=c|x=d))",
  ],
  "exists x forall y (x=y | R(x,y) | exists z (R(x,z)&R(z,y)))",
);
const mixed = questionOf(
  ["forall x y (P(x) | Q(y))", "forall x (P(x) -> S(x))", "forall x (Q(x) -> T(x))"],
  "forall x S(x) | forall x T(x)",
);

describe("derivations with cases", () => {
  it("are accepted, and define only what they use", () => {
    const { derivation } = derive(mixed);
    expect(derivation.record.made.length).toBeGreaterThan(0);
    for (const made of derivation.record.made) {
      expect(made[0]).toBe("define");
      expect(JSON.stringify(derivation.record.lines)).toContain(`"${made[1]}"`);
    }
  });

  it("are read with what the names stand for", () => {
    const { derivation } = derive(mixed);
    const fact: DerivationFact = {
      fact: "derivation",
      premises: derivation.premises,
      conclusion: mixed.premises.length,
      ...derivation.record,
    };
    const text = blocksToText(
      showDerivation({
        role: "the conclusion follows",
        premises: derivation.premises.map((place) => ({
          label: `a${place + 1}`,
          formula: mixed.premises[place]!,
        })),
        conclusion: mixed.conclusion,
        fact,
      }),
    );
    expect(text).not.toMatch(/\bd\d|case\d/);
  });

  it("are found for tournaments of four points, of cases about their points alone", () => {
    const { derivation } = derive(tournament, SPLITTING_STRATEGY);
    expect(derivation.record.made).toEqual([]);
  });

  it("take the same steps every time, within the limits", () => {
    const hard = questions.find(({ id }) => id.startsWith("q-i307"))!;
    const task = questionOf(hard.premises, hard.conclusion);
    const { task: clauses } = prepare(task, {
      premises: [...task.premises.keys()],
      unfold: true,
      miniscope: false,
      letters: "none",
      mostClauses: 32,
    });
    const limits = { clauses: 1_000, literals: 1_000_000 };
    const steps = [0, 1].map(() => {
      const meter = new Meter(1e6);
      expect(run(clauses, SPLITTING_STRATEGY, limits, meter)).toEqual({ result: "gave-up", reason: "steps" });
      return meter.steps;
    });
    expect(steps[0]).toBe(steps[1]);
    const small = run(clauses, SPLITTING_STRATEGY, { clauses: 100_000, literals: 3_000 });
    expect(small).toEqual({ result: "gave-up", reason: "memory" });
    const meter = new Meter(200);
    expect(() => run(clauses, SPLITTING_STRATEGY, LIMITS, meter)).toThrow(WorkEnded);
    expect(meter.ended).toBe("budget");
  });
});
