/** Saturation: every refutation is laid before the checker, and no verdict is wrong on small and collected questions. */
import { describe, expect, it } from "vitest";
import type { CreateSolver } from "../lib/derivation/ground-solver.ts";
import type { ClauseTask, EngineOutcome } from "../lib/derivation/refutation.ts";
import { saturate } from "../lib/derivation/saturation/saturate.ts";
import * as strategies from "../lib/derivation/saturation/strategy.ts";
import { DEFAULT_STRATEGY, type Strategy } from "../lib/derivation/saturation/strategy.ts";
import { checkDerivation } from "../lib/evidence/derivation.ts";
import type {
  AtomRecord,
  ClauseRecord,
  FormulaRecord,
  LineRecord,
  MadeFormula,
  TermRecord,
} from "../lib/evidence/format.ts";
import { Meter, WorkEnded } from "../lib/logic/meter.ts";
import { clauseForm } from "../lib/logic/records/clause-form.ts";
import { recordFormula } from "../lib/logic/records/formulas.ts";
import { Solver } from "../lib/structures/sat/solver.ts";
import { claims, questions, readSentences } from "./support/corpora.ts";

const NAMED: readonly (readonly [string, Strategy])[] = Object.entries(strategies);
const createSolver: CreateSolver = (onDerived) => new Solver({ observer: { onDerived } });
const LIMITS = { clauses: 5_000, literals: 1_000_000 };

interface Question {
  readonly sentences: readonly FormulaRecord[];
  readonly task: ClauseTask;
}

/** The clauses of premises and negated conclusion; without a conclusion, of the premises. */
function questionOf(premises: readonly string[], conclusion: string | null): Question {
  const sentences = readSentences(conclusion === null ? premises : [...premises, conclusion]).map(
    recordFormula,
  );
  const clauses = sentences.flatMap((sentence, formula) => {
    const goal = conclusion !== null && formula === premises.length;
    return clauseForm(goal ? ["not", sentence] : sentence, formula).map((clause, place) => ({
      clause,
      formula,
      place,
      goal,
    }));
  });
  return { sentences, task: { clauses, formulas: sentences.length } };
}

/** Runs a strategy, and lays a refutation before the checker. */
function decide(
  { sentences, task }: Question,
  strategy: Strategy = DEFAULT_STRATEGY,
  limits = LIMITS,
): { outcome: EngineOutcome; steps: number } {
  const meter = new Meter(Number.POSITIVE_INFINITY);
  const outcome = saturate(task, strategy, limits, meter, createSolver);
  if (outcome.result === "refuted") {
    const lines = outcome.refutation.steps.map((step): LineRecord => {
      switch (step.from) {
        case "input": {
          const { formula, place } = task.clauses[step.input]!;
          return ["clause", formula, place];
        }
        case "identity":
          return ["identity", step.clause];
        case "definition":
          return ["clause", task.formulas + step.definition, step.place];
        default:
          return ["infer", step.clause, step.uses];
      }
    });
    const hasConclusion = task.clauses.some(({ goal }) => goal);
    const premises = [...sentences.keys()].slice(0, hasConclusion ? -1 : undefined);
    const conclusion = hasConclusion ? premises.length : null;
    const made = outcome.refutation.definitions.map(
      ({ name, parameters, body }): MadeFormula => ["define", name, parameters, body],
    );
    checkDerivation(
      { fact: "derivation", premises, conclusion, made, lines },
      sentences,
      "refutation",
      new Meter(1_000_000),
    );
  }
  return { outcome, steps: meter.steps };
}

const irreflexive = "forall x ~R(x,x)";
const transitive = "forall x y z (R(x,y) & R(y,z) -> R(x,z))";
const total = "forall x y (R(x,y) | x = y | R(y,x))";
const euclidean = "forall x y z (R(x,y) & R(x,z) -> R(y,z))";
const dense = "forall x y (R(x,y) -> exists z (R(x,z) & R(z,y)))";
const serial = "forall x exists y R(x,y)";

describe("known theorems", () => {
  // Textbook facts about orders and identity.
  it.each([
    ["a strict order is asymmetric", [irreflexive, transitive], "forall x y (R(x,y) -> ~R(y,x))"],
    ["reflexive and euclidean is symmetric", ["forall x R(x,x)", euclidean], "forall x y (R(x,y) -> R(y,x))"],
    [
      "reflexive and euclidean is transitive",
      ["forall x R(x,x)", euclidean],
      "forall x y z (R(x,y) & R(y,z) -> R(x,z))",
    ],
    ["an asymmetric relation is irreflexive", ["forall x y (R(x,y) -> ~R(y,x))"], "forall x ~R(x,x)"],
    [
      "there is at most one least element",
      ["forall x y (R(x,y) & R(y,x) -> x = y)"],
      "forall a b (forall x R(a,x) & forall x R(b,x) -> a = b)",
    ],
    [
      "in a dense total order nothing comes next",
      [irreflexive, transitive, total, dense, serial],
      "~exists x y (R(x,y) & forall z (R(x,z) -> z = y | R(y,z)))",
    ],
    ["identity is symmetric and transitive", [], "forall x y z (x = y & y = z -> z = x)"],
    ["equals for equals", [], "forall x y z (x = y & R(x,z) -> R(y,z))"],
    [
      "a function that is its own inverse is one to one",
      ["forall x exists y forall z (F(x,z) <-> z = y)", "forall x y (F(x,y) -> F(y,x))"],
      "forall x y z (F(x,z) & F(y,z) -> x = y)",
    ],
    [
      "two points at most, one of them related to all: some loop",
      ["exists a b forall x (x = a | x = b)", "exists x forall y R(x,y)"],
      "exists x R(x,x)",
    ],
    ["nobody shaves just those who do not shave themselves", [], "~exists b forall x (S(b,x) <-> ~S(x,x))"],
  ])("%s", (_, premises, conclusion) => {
    for (const [name, strategy] of NAMED) {
      const { outcome } = decide(questionOf(premises, conclusion), strategy);
      if (strategy === DEFAULT_STRATEGY) expect(outcome.result, name).toBe("refuted");
      expect(outcome.result, name).not.toBe("saturated");
    }
  });

  it("finds contradictory premises", () => {
    const { outcome } = decide(questionOf([irreflexive, "exists x R(x,x)"], null));
    expect(outcome.result).toBe("refuted");
  });

  it("starts from the clause without literals", () => {
    expect(decide(questionOf(["false"], null)).outcome.result).toBe("refuted");
  });
});

describe("saturation", () => {
  it.each([
    ["no clauses", [], null],
    ["a strict order", [irreflexive, transitive], null],
    ["a strict order is not total", [irreflexive, transitive], total],
    ["a serial relation need not have a loop", [serial], "exists x R(x,x)"],
    ["symmetric does not give transitive", ["forall x y (R(x,y) -> R(y,x))"], transitive],
    ["a single point", ["forall x y x = y"], "exists x R(x,x)"],
  ])("is said of %s", (_, premises, conclusion) => {
    expect(decide(questionOf(premises, conclusion)).outcome).toEqual({ result: "saturated" });
  });

  it("is not said by strategies that leave something out", () => {
    const question = questionOf([serial], "exists x R(x,x)");
    const shallow = { ...DEFAULT_STRATEGY, mostDepth: 0 };
    const supported = { ...DEFAULT_STRATEGY, isSupported: true };
    expect(decide(question, supported).outcome).toEqual({ result: "gave-up", reason: "incomplete" });
    const growing = questionOf(["exists x R(x,x)", "forall x (R(x,x) -> exists y (R(y,y) & x != y))"], null);
    expect(decide(growing, shallow).outcome).toEqual({ result: "gave-up", reason: "incomplete" });
  });
});

describe("limits", () => {
  // The order of the rationals shows that this does not follow, and what follows from it never ends.
  const runaway = questionOf([irreflexive, transitive, serial, dense, total], "exists x forall y ~R(x,y)");

  it("gives up after the clauses that it may generate, each a step", () => {
    for (const clauses of [0, 1, 500]) {
      const { outcome, steps } = decide(runaway, DEFAULT_STRATEGY, { clauses, literals: 1_000_000 });
      expect(outcome).toEqual({ result: "gave-up", reason: "steps" });
      expect(steps).toBe(clauses);
    }
  });

  it("gives up when it keeps too much", () => {
    const { outcome, steps } = decide(runaway, DEFAULT_STRATEGY, { clauses: 1_000_000, literals: 2_000 });
    expect(outcome).toEqual({ result: "gave-up", reason: "memory" });
    expect(steps).toBeLessThan(20_000);
  });

  it("leaves out clauses that are too long, and says so", () => {
    const variables = Array.from({ length: 300 }, (_, v) => `x${v}`);
    const long = variables.map((x): AtomRecord => ["is", "R", x, x]);
    const wide: ClauseRecord = [["is", "Q", ...variables]];
    for (const clause of [long, wide]) {
      const task = { clauses: [{ clause, formula: 0, place: 0, goal: false }], formulas: 1 };
      const outcome = saturate(task, DEFAULT_STRATEGY, LIMITS, new Meter());
      expect(outcome).toEqual({ result: "gave-up", reason: "incomplete" });
    }
  });

  it("ends with the budget", () => {
    const meter = new Meter(300);
    expect(() => saturate(runaway.task, DEFAULT_STRATEGY, LIMITS, meter)).toThrow(WorkEnded);
    expect(meter).toMatchObject({ ended: "budget", steps: 300 });
  });

  it("looks for interrupts with every step", () => {
    let polls = 0;
    const meter = new Meter(Number.POSITIVE_INFINITY, () => ++polls > 200);
    expect(() => saturate(runaway.task, DEFAULT_STRATEGY, LIMITS, meter)).toThrow(WorkEnded);
    expect(meter.ended).toBe("interrupted");
    expect(polls).toBe(201);
    expect(meter.steps).toBeLessThanOrEqual(202);
  });

  it("takes the same steps whatever was run before", () => {
    const run = () => NAMED.map(([, strategy]) => decide(runaway, strategy, { clauses: 400, literals: 1e6 }));
    const question = questionOf([irreflexive, transitive, total, dense], "forall x y (R(x,y) -> ~R(y,x))");
    const before = [run(), decide(question)];
    decide(questionOf(["forall x R(x,x)", euclidean], transitive));
    expect([run(), decide(question)]).toEqual(before);
  });
});

describe("collected questions", () => {
  it.each(NAMED)("%s gives no wrong answer, and the checker accepts all it derives", (_, strategy) => {
    let refuted = 0;
    for (const { id, premises, conclusion, expected } of [...questions, ...claims]) {
      const { outcome } = decide(questionOf(premises, conclusion), strategy, { clauses: 400, literals: 1e6 });
      if (outcome.result === "refuted") refuted += 1;
      if (expected === "holds") expect(outcome.result, id).not.toBe("saturated");
      else expect(outcome.result, id).not.toBe("refuted");
    }
    expect(refuted).toBeGreaterThan(100);
  });
});

/** Numbers below a bound, the same for the same start. */
function randomSource(start: number): (below: number) => number {
  let state = start;
  return (below) => {
    state = (Math.imul(state, 1_103_515_245) + 12_345) & 0x7fffffff;
    return (state >> 8) % below;
  };
}

/** Clauses in R of two places, P of one and identity. */
function randomClauses(random: (below: number) => number, term: () => TermRecord): ClauseRecord[] {
  const atom = (): AtomRecord => {
    const kind = random(5);
    if (kind < 2) return ["=", term(), term()];
    return kind < 4 ? ["is", "R", term(), term()] : ["is", "P", term()];
  };
  return Array.from({ length: 4 + random(6) }, () =>
    Array.from({ length: 1 + random(3) }, () => (random(2) === 0 ? atom() : (["not", atom()] as const))),
  );
}

/** Complete ones. */
const VARIANTS: readonly Strategy[] = [
  DEFAULT_STRATEGY,
  strategies.TERSE_STRATEGY,
  strategies.UNSELECTED_STRATEGY,
  { ...DEFAULT_STRATEGY, ordering: "path", selection: "lightest" },
  { ...DEFAULT_STRATEGY, ordering: "none", selection: "fewest-partners", selectsSparingly: false },
  { ...DEFAULT_STRATEGY, precedence: "frequent", selection: "groundest", byWeight: 1 },
  { ...DEFAULT_STRATEGY, isSplit: true },
  { ...strategies.UNSELECTED_STRATEGY, isSplit: true, nameWeight: 0, byWeight: 1 },
  { ...DEFAULT_STRATEGY, ordering: "none", selection: "groundest", isSplit: true, nameWeight: 5 },
];

function resultOf(
  clauses: readonly ClauseRecord[],
  strategy: Strategy,
  most: number,
): EngineOutcome["result"] {
  const input = clauses.map((clause, place) => ({ clause, formula: 0, place, goal: place === 0 }));
  const limits = { clauses: most, literals: 1_000_000 };
  return saturate({ clauses: input, formulas: 1 }, strategy, limits, new Meter(1e9), createSolver).result;
}

describe("random clauses with functions", () => {
  const seed = 4_711;

  it(`all strategies agree (seed ${seed})`, () => {
    const random = randomSource(seed);
    const term = (depth: number): TermRecord => {
      const kind = random(depth > 1 ? 3 : 6);
      if (kind < 2) return ["x", "y"][kind]!;
      if (kind < 4) return ["0.0"];
      return kind === 4 ? ["0.1", term(depth + 1)] : ["0.2", term(depth + 1), term(depth + 1)];
    };
    const found = { refuted: 0, saturated: 0, "gave-up": 0 };
    for (let round = 0; round < 400; round += 1) {
      const clauses = randomClauses(random, () => term(0));
      const results = new Set(VARIANTS.map((strategy) => resultOf(clauses, strategy, 400)));
      expect(results.has("refuted") && results.has("saturated"), JSON.stringify(clauses)).toBe(false);
      for (const result of results) found[result] += 1;
    }
    expect(found.refuted).toBeGreaterThan(50);
    expect(found.saturated).toBeGreaterThan(50);
  });
});

describe("random clauses over a few constants", () => {
  // Such clauses have a model just if they have one on as many points as there are constants (Bernays & Schönfinkel
  // 1928): all structures are tried.
  const CONSTANTS = ["0.0", "0.1"];
  const seed = 20_261_201;

  /** Whether some structure on up to two points makes all clauses true. */
  function hasModel(clauses: readonly ClauseRecord[]): boolean {
    for (let size = 1; size <= 2; size += 1)
      for (let choice = 0; choice < size ** 2; choice += 1)
        for (let table = 0; table < 2 ** (size * size + size); table += 1) {
          const value = (term: TermRecord, x: number, y: number): number => {
            if (typeof term === "string") return term === "x" ? x : y;
            return Math.floor(choice / size ** CONSTANTS.indexOf(term[0])) % size;
          };
          const holds = (atom: AtomRecord, x: number, y: number): boolean => {
            if (atom[0] === "=") return value(atom[1], x, y) === value(atom[2], x, y);
            const first = value(atom[2]!, x, y);
            const bit = atom[1] === "P" ? size * size + first : first * size + value(atom[3]!, x, y);
            return ((table >> bit) & 1) === 1;
          };
          const isTrue = (clause: ClauseRecord, x: number, y: number) =>
            clause.some((literal) =>
              literal[0] === "not" ? !holds(literal[1], x, y) : holds(literal as AtomRecord, x, y),
            );
          const points = [...Array(size).keys()];
          if (clauses.every((clause) => points.every((x) => points.every((y) => isTrue(clause, x, y)))))
            return true;
        }
    return false;
  }

  it(`agrees with all structures (seed ${seed})`, () => {
    const random = randomSource(seed);
    const term = (): TermRecord => (random(5) < 2 ? ["x", "y"][random(2)]! : [CONSTANTS[random(2)]!]);
    const found = { refuted: 0, saturated: 0, "gave-up": 0 };
    for (let round = 0; round < 400; round += 1) {
      const clauses = randomClauses(random, term);
      const isConsistent = hasModel(clauses);
      for (const strategy of VARIANTS) {
        const result = resultOf(clauses, strategy, 3_000);
        found[result] += 1;
        if (result !== "gave-up")
          expect(result, JSON.stringify(clauses)).toBe(isConsistent ? "saturated" : "refuted");
      }
    }
    expect(found.refuted).toBeGreaterThan(200);
    expect(found.saturated).toBeGreaterThan(200);
  });
});
