/** Derivations: preparation, assembly, turns; every derivation found is laid before the checker. */
import { describe, expect, it } from "vitest";
import type { Derivation, DerivationTask, Turn } from "../lib/derivation/derive.ts";
import { prepareTurn, runTurn } from "../lib/derivation/derive.ts";
import type { Preparation } from "../lib/derivation/prepare.ts";
import { DEFAULT_STRATEGY } from "../lib/derivation/saturation/strategy.ts";
import { DerivationSearch } from "../lib/derivation/turns.ts";
import { checkEvidence } from "../lib/evidence/check.ts";
import { EvidenceWriter } from "../lib/inquiry/evidence-writer.ts";
import { Meter, WorkEnded } from "../lib/logic/meter.ts";
import { Solver } from "../lib/structures/sat/solver.ts";
import { claims, questions, readSentences } from "./support/corpora.ts";

const createSolver = (onDerived: (clause: readonly number[]) => void) =>
  new Solver({ observer: { onDerived } });

function taskOf(premises: readonly string[], conclusion: string | null): DerivationTask {
  const sentences = readSentences(conclusion === null ? premises : [...premises, conclusion]);
  return {
    premises: sentences.slice(0, premises.length),
    conclusion: conclusion === null ? null : sentences.at(-1)!,
  };
}

/** Lays a derivation before the checker as the answer to the question that the task is. */
function expectAccepted(task: DerivationTask, derivation: Derivation): void {
  const writer = new EvidenceWriter();
  const premises = writer.theory(task.premises);
  const conclusion = writer.sentence(task.conclusion ?? { kind: "false" });
  writer.addDerivation(task, derivation);
  const evidence = writer.finish({ ask: "entails", premises, conclusion }, "holds");
  expect(checkEvidence(JSON.parse(JSON.stringify(evidence)))).toMatchObject({ accepted: true });
}

interface Found {
  readonly derivation: Derivation | null;
  readonly result: "derived" | "saturated" | "open";
  readonly steps: number;
}

function search(task: DerivationTask, limit: number, share = limit): Found {
  const found = new DerivationSearch(task, createSolver);
  let steps = 0;
  let meter = new Meter(share);
  for (;;) {
    try {
      const outcome = found.next(meter);
      if (outcome.result === "gave-up") continue;
      steps += meter.steps;
      const derivation = outcome.result === "derived" ? outcome.derivation : null;
      if (derivation !== null) expectAccepted(task, derivation);
      return { derivation, result: outcome.result, steps };
    } catch (problem) {
      if (!(problem instanceof WorkEnded)) throw problem;
      steps += meter.steps;
      if (steps >= limit) return { derivation: null, result: "open", steps };
      meter = new Meter(share);
    }
  }
}

const plain: Preparation = {
  premises: [],
  unfold: false,
  miniscope: false,
  letters: "none",
  mostClauses: 32,
};

/** One turn of saturation, or of instances. */
function runOne(
  task: DerivationTask,
  preparation: Partial<Preparation>,
  by: "saturation" | "instances" = "saturation",
  clauses = 2_000,
) {
  const all = task.premises.map((_, place) => place);
  const engine = by === "instances" ? { by } : { by, strategy: DEFAULT_STRATEGY };
  const turn: Turn = { engine, clauses, preparation: { ...plain, premises: all, ...preparation } };
  const prepared = prepareTurn(task, turn.preparation)!;
  const outcome = runTurn(task, turn, prepared, new Meter(20 * clauses), createSolver);
  if (outcome.result === "derived") expectAccepted(task, outcome.derivation);
  return { prepared, outcome };
}

function derivedBy(...args: Parameters<typeof runOne>): Derivation {
  const { outcome } = runOne(...args);
  if (outcome.result !== "derived") throw new Error(outcome.result);
  return outcome.derivation;
}

const order = ["forall x ~R(x,x)", "forall x y z (R(x,y)&R(y,z)->R(x,z))"];
const asymmetry = "forall x y (R(x,y)->~R(y,x))";

describe("preparation", () => {
  it("unfolds explicit definitions in order, and leaves them out", () => {
    const task = taskOf(
      [
        "forall x y (B(x,y) <-> A(x,y) & ~A(y,x))",
        "forall y x (A(x,y) <-> exists z (R(x,z) & R(z,y)))",
        "forall x y z (R(x,y)&R(y,z)->R(x,z))",
      ],
      "forall x y (B(x,y) -> R(x,y))",
    );
    const { prepared } = runOne(task, { unfold: true });
    const names = new Set(
      prepared.task.clauses.flatMap(({ clause }) => clause.map((l) => (l[0] === "not" ? l[1] : l)[1])),
    );
    expect([...names]).toEqual(["R"]);
    const derivation = derivedBy(task, { unfold: true });
    expect(derivation.premises).toEqual([0, 1, 2]);
    expect(derivation.record.made.map(([kind]) => kind)).toEqual(["unfold", "unfold"]);
    // Not unfolded, it is derived too, and with nothing made.
    expect(derivedBy(task, {}).record.made).toEqual([]);
  });

  it("keeps what only looks like a definition, and definitions in a circle", () => {
    for (const premise of [
      "forall x y (A(x,y) <-> A(y,x))",
      "forall x (A(x,x) <-> R(x,x))",
      "forall x y z (A(x,y) <-> R(x,y) | R(z,z))",
    ]) {
      const { prepared } = runOne(taskOf([premise], null), { unfold: true });
      expect(prepared.formulas, premise).toHaveLength(1);
      expect(prepared.task.clauses.length).toBeGreaterThan(0);
    }
    const circle = taskOf(
      ["forall x (A(x) <-> B(x))", "forall x (B(x) <-> A(x))"],
      "forall x (A(x) -> B(x))",
    );
    const { prepared, outcome } = runOne(circle, { unfold: true });
    expect(prepared.task.clauses.length).toBeGreaterThan(0);
    expect(outcome.result).toBe("derived");
    // Of two definitions of one relation, the second says what the first's body is equivalent to.
    const twice = taskOf(["forall x (A(x) <-> B(x))", "forall x (A(x) <-> C(x))"], "forall x (B(x) -> C(x))");
    expect(derivedBy(twice, { unfold: true }).premises).toEqual([0, 1]);
  });

  it("names parts where disjunctions would become many clauses", () => {
    const parts = Array.from({ length: 14 }, (_, k) => `(R(x,y) & P${k}(x))`.replace(/P(\d+)/, "S(x,x) & P"));
    const wide = `forall x y (${parts.join(" | ")})`;
    const task = taskOf([wide], "forall x P(x)");
    const { prepared } = runOne(task, { mostClauses: 8 });
    expect(prepared.formulas.some(({ source }) => source.from === "made" && source.made[0] === "fold")).toBe(
      true,
    );
    expect(prepared.task.clauses.length).toBeLessThan(60);
    expect(derivedBy(task, { mostClauses: 8 }).record.made.map(([kind]) => kind)).toContain("fold");
    // Nested equivalences: 2^11 clauses of 12 literals as written, too many for a clause form.
    const letters = Array.from({ length: 12 }, (_, k) => `${"ABCDEFGHIJKL"[k]}(x)`);
    const nested = `forall x (${letters.join(" <-> ")})`;
    const turned = `forall x (${[...letters].reverse().join(" <-> ")})`;
    const chain = taskOf([nested], turned);
    expect(prepareTurn(chain, { ...plain, premises: [0], mostClauses: Number.POSITIVE_INFINITY })).toBeNull();
    const { prepared: named } = runOne(chain, {}, "saturation", 10);
    expect(named.task.clauses.length).toBeLessThan(400);
  });

  it("miniscopes", () => {
    const task = taskOf(["forall x exists y (R(x,x) & S(y,y))"], "exists y S(y,y)");
    const derivation = derivedBy(task, { miniscope: true });
    expect(derivation.record.made.map(([kind]) => kind)).toContain("miniscope");
  });

  it("takes closed parts as letters, the same up to names of variables", () => {
    const large = (a: string, b: string) =>
      `forall ${a} exists ${b} (R(${a},${b}) <-> (S(${b},${a}) <-> exists c (R(c,${a}) <-> S(c,${b}))))`;
    const task = taskOf([`(${large("x", "y")}) & exists x R(x,x)`, "forall x R(x,x)"], large("u", "v"));
    const derivation = derivedBy(task, { letters: "alone" }, "instances");
    expect(derivation.premises).toEqual([0]);
    expect(derivation.record.lines.length).toBeLessThanOrEqual(3);
    expect(search(task, 100).steps).toBeLessThan(10);
  });

  it("calls new relations by names that are free", () => {
    const parts = Array.from({ length: 7 }, (_, k) => `(d1(x,x) & d2(x,y) & d${(k % 2) + 1}(y,x))`);
    const relation = (name: string) => ({ name, places: 2, infix: false });
    const x = (name: string, a: string, b: string) => ({
      kind: "atom" as const,
      relation: relation(name),
      args: [a, b],
    });
    const or = parts.map(() => ({
      kind: "and" as const,
      parts: [x("d1", "x", "x"), x("d2", "x", "y")],
    }));
    const task: DerivationTask = {
      premises: [
        {
          kind: "forall",
          variable: "x",
          body: { kind: "forall", variable: "y", body: { kind: "or", parts: or } },
        },
      ],
      conclusion: { kind: "forall", variable: "x", body: x("d1", "x", "x") },
    };
    const { made } = derivedBy(task, { mostClauses: 4 }).record;
    const names = made.flatMap((one) => (one[0] === "define" ? [one[1]] : []));
    expect(names.length).toBeGreaterThan(0);
    expect(names).not.toContain("d1");
    expect(names).not.toContain("d2");
  });
});

describe("condensing", () => {
  const clauseOf = (text: string) => {
    const { prepared } = runOne(taskOf([text], null), {}, "saturation", 1);
    return prepared.task.clauses.map(({ clause }) => JSON.stringify(clause));
  };

  it("makes of a clause the smallest part that is an instance of it", () => {
    expect(clauseOf("forall x y z (R(x,y) | R(x,z))")).toEqual([JSON.stringify([["is", "R", "x", "y"]])]);
    expect(clauseOf("forall x y z (R(x,y) | R(y,z) | R(z,z))")).toEqual([
      JSON.stringify([["is", "R", "z", "z"]]),
    ]);
    // Nothing can be put for the variables here that gives a part.
    const path = "forall x y z (~R(x,y) | ~R(y,z) | R(x,z))";
    expect(JSON.parse(clauseOf(path)[0]!)).toHaveLength(3);
  });

  it("is told in the derivation", () => {
    const task = taskOf(["forall x y z (R(x,y) | R(x,z) | S(x,x))"], "forall x (S(x,x) | exists y R(x,y))");
    for (const by of ["saturation", "instances"] as const)
      expect(derivedBy(task, {}, by).premises).toEqual([0]);
  });
});

describe("derivations by instances", () => {
  it("do not decide when a clause was too large to look at", () => {
    const many = Array.from({ length: 70 }, (_, k) => `R(x,c${k})`).join(" | ");
    const variables = Array.from({ length: 70 }, (_, k) => `c${k}`).join(" ");
    const { outcome } = runOne(
      taskOf([`exists ${variables} forall x (${many})`], null),
      {},
      "instances",
      5_000,
    );
    expect(outcome.result).toBe("gave-up");
  });

  it("go through many learned clauses, of which those that matter are kept", () => {
    // Five points in four holes, no two in one (common practice).
    const points = ["a", "b", "c", "d", "e"];
    const holes = ["A", "B", "C", "D"];
    const sits = `forall x (${holes.map((hole) => `${hole}(x)`).join(" | ")})`;
    const apart = holes.map((hole) => `forall x y (${hole}(x) & ${hole}(y) -> x=y)`);
    const pairs = points.flatMap((x, place) => points.slice(place + 1).map((y) => `${x}!=${y}`));
    const task = taskOf([sits, ...apart], `~exists ${points.join(" ")} (${pairs.join(" & ")})`);
    const derivation = derivedBy(task, {}, "instances");
    expect(derivation.premises).toEqual([0, 1, 2, 3, 4]);
    expect(derivation.record.lines.length).toBeGreaterThan(10);
    const { outcome } = runOne(
      taskOf(
        [sits, ...apart],
        `~exists a b c d (${pairs.filter((pair) => !pair.includes("e")).join(" & ")})`,
      ),
      {},
      "instances",
    );
    expect(outcome.result).toBe("saturated");
  });
});

describe("derivations", () => {
  it("have no lines that repeat others or merely put terms for variables", () => {
    for (const by of ["saturation", "instances"] as const) {
      const { record } = derivedBy(taskOf(order, asymmetry), {}, by);
      expect(record.lines.length).toBeLessThanOrEqual(6);
      for (const line of record.lines.slice(0, -1))
        if (line[0] === "infer") expect(line[2].length).toBeGreaterThan(1);
    }
  });

  it("name the premises that they use, and no others", () => {
    const task = taskOf(["exists x S(x,x)", order[0]!, "forall x exists y R(x,y)", order[1]!], asymmetry);
    for (const by of ["saturation", "instances"] as const) {
      const derivation = derivedBy(task, {}, by);
      expect(derivation.premises).toEqual([1, 3]);
      expect(derivation.usesConclusion).toBe(true);
    }
    const some = derivedBy(task, { premises: [1, 3] });
    expect(some.premises).toEqual([1, 3]);
    const { outcome } = runOne(task, { premises: [0, 1] });
    expect(outcome).toEqual({ result: "gave-up", reason: "incomplete" });
  });

  it("tell when the premises contradict each other", () => {
    const task = taskOf([...order, "exists x y (R(x,y) & R(y,x))"], "exists x S(x,x)");
    const { derivation } = search(task, 1_000);
    expect(derivation).toMatchObject({ premises: [0, 1, 2], usesConclusion: false });
    const alone = search(taskOf([...order, "exists x y (R(x,y) & R(y,x))"], null), 1_000);
    expect(alone.derivation).toMatchObject({ premises: [0, 1, 2], usesConclusion: false });
  });

  it("need no premises for what is valid", () => {
    const valid = "(exists x forall y R(x,y)) -> forall y exists x R(x,y)";
    expect(search(taskOf(["exists x S(x,x)"], valid), 100).derivation?.premises).toEqual([]);
    const drinker = "exists x (S(x) -> forall y S(y))";
    for (const by of ["saturation", "instances"] as const)
      expect(derivedBy(taskOf([], drinker), {}, by).usesConclusion).toBe(true);
  });
});

describe("the search", () => {
  it("says when there is no derivation", () => {
    expect(search(taskOf(order, "forall x y (R(x,y) | R(y,x))"), 10_000).result).toBe("saturated");
    expect(search(taskOf([], null), 10).result).toBe("saturated");
    expect(search(taskOf(["exists x y (x!=y)"], "forall x y z (x=y | y=z | x=z)"), 10_000).result).toBe(
      "saturated",
    );
  });

  it("decides clauses without proper functions by their instances", () => {
    const cycle = ["forall x y (R(x,y) -> ~R(y,x))", "exists x y z (R(x,y) & R(y,z) & R(z,x))"];
    expect(runOne(taskOf(cycle, null), {}, "instances").outcome.result).toBe("saturated");
    const { outcome } = runOne(taskOf([...cycle, order[1]!], null), {}, "instances");
    expect(outcome.result).toBe("derived");
  });

  it("is over at once where the conclusion is a premise or follows by its form alone", () => {
    const dense = "forall x y (R(x,y) -> exists z (R(x,z) & R(z,y)))";
    const renamed = "forall u v (R(u,v) -> exists w (R(u,w) & R(w,v)))";
    expect(search(taskOf([...order, dense], renamed), 100).steps).toBeLessThan(30);
    const either = search(taskOf([`(${dense}) | (${order[1]})`, `~(${renamed})`], order[1]!), 100);
    expect(either.derivation?.premises).toEqual([0, 1]);
    expect(either.steps).toBeLessThan(30);
  });

  it("does the same at every time, however the steps are handed out", () => {
    const sample = questions.filter((_, index) => index % 9 === 0);
    for (const { premises, conclusion } of sample) {
      const task = taskOf(premises, conclusion);
      const once = search(task, 700);
      const again = search(task, 700);
      expect(again).toEqual(once);
      if (once.result === "open") continue;
      const inShares = search(task, 20_000, once.steps);
      expect(inShares.derivation).toEqual(once.derivation);
    }
  });

  it("stops when it is interrupted, and goes on afterwards", () => {
    const hard = questions.find(({ id }) => id === "q-b105_meet3")!;
    const task = taskOf(hard.premises, hard.conclusion);
    const found = new DerivationSearch(task, createSolver);
    let polls = 0;
    const meter = new Meter(Number.POSITIVE_INFINITY, () => {
      polls += 1;
      return polls > 50;
    });
    expect(() => {
      for (;;) found.next(meter);
    }).toThrow(WorkEnded);
    expect(meter.ended).toBe("interrupted");
    expect(found.done).toBe(false);
    const before = found.generated;
    expect(found.next(new Meter(20_000)).result).toMatch(/gave-up|derived/);
    expect(found.generated).toBeGreaterThan(before);
  });

  it("derives nothing that fails, and what holds on a sample of the collected questions", () => {
    const sample = [...questions, ...claims].filter((_, index) => index % 2 === 0);
    let derived = 0;
    let holding = 0;
    for (const { id, premises, conclusion, expected } of sample) {
      const { result } = search(taskOf(premises, conclusion), 1_000);
      if (expected === "holds") {
        holding += 1;
        expect(result, id).not.toBe("saturated");
        if (result === "derived") derived += 1;
      } else expect(result, id).not.toBe("derived");
    }
    expect(derived / holding).toBeGreaterThan(0.85);
  });
});
