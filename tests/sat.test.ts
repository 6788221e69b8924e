/** The propositional solver against truth by definition on random clauses, and against published numbers. */
import fc from "fast-check";
import { describe, expect, it } from "vitest";
import { Meter } from "../lib/logic/meter.ts";
import { Solver } from "../lib/structures/sat/solver.ts";
import {
  type Clause,
  type Cnf,
  cnfs,
  firstBadLine,
  holds,
  literals,
  modelsOf,
  type ProofLine,
  pigeonhole,
  solverFor,
} from "./support/sat-check.ts";

const seed = Number(process.env.TWOPLACE_SEED ?? 20261201);
const options = (numRuns: number) => ({ seed, numRuns, verbose: 1 as const });

function foundAssignment(solver: Solver): number {
  let assignment = 0;
  for (let variable = 1; variable <= solver.variableCount; variable += 1)
    if (solver.value(variable)) assignment += 2 ** (variable - 1);
  return assignment;
}

/** All that an enumeration gives, as texts of 0 and 1. */
function enumerated(solver: Solver, over: readonly number[], meter = new Meter()): string[] {
  const found: string[] = [];
  const end = solver.enumerate(meter, over, (values) => {
    found.push(values.join(""));
    return true;
  });
  expect(end).toBe("complete");
  return found;
}

function projections(models: readonly number[], over: readonly number[]): string[] {
  const texts = models.map((model) => over.map((variable) => (model >> (variable - 1)) & 1).join(""));
  return [...new Set(texts)].sort();
}

describe("one model", () => {
  it("is found exactly where there is one, and is one", () => {
    fc.assert(
      fc.property(cnfs(10), (cnf) => {
        const solver = solverFor(cnf);
        const models = modelsOf(cnf);
        const answer = solver.solve(new Meter());
        expect(answer).toBe(models.length > 0 ? "satisfiable" : "unsatisfiable");
        if (answer === "satisfiable") expect(models).toContain(foundAssignment(solver));
      }),
      options(2000),
    );
  });

  it("follows clauses and variables that are added between searches", () => {
    fc.assert(
      fc.property(fc.array(cnfs(8), { minLength: 2, maxLength: 4 }), (parts) => {
        const solver = new Solver();
        const clauses: Clause[] = [];
        let variables = 0;
        for (const part of parts) {
          solverFor(part, solver);
          clauses.push(...part.clauses);
          variables = Math.max(variables, part.variables);
          const satisfiable = modelsOf({ variables, clauses }).length > 0;
          expect(solver.solve(new Meter())).toBe(satisfiable ? "satisfiable" : "unsatisfiable");
        }
      }),
      options(500),
    );
  });

  it("is found for clauses that repeat literals, are true by themselves, or are empty", () => {
    const solver = solverFor({
      variables: 3,
      clauses: [
        [1, 1, 1],
        [2, -2],
        [-1, -1, 3, 3],
        [2, -2, -3],
      ],
    });
    expect(solver.solve(new Meter())).toBe("satisfiable");
    expect([solver.value(1), solver.value(3)]).toEqual([true, true]);
    expect(solver.addClause([-3, -1])).toBe(false);
    expect(solver.solve(new Meter())).toBe("unsatisfiable");
    expect(solver.core()).toEqual([]);
    const empty = new Solver();
    expect(empty.solve(new Meter())).toBe("satisfiable");
    expect(empty.addClause([])).toBe(false);
    expect(empty.solve(new Meter())).toBe("unsatisfiable");
    expect(() => new Solver().addClause([1])).toThrow(RangeError);
    expect(() => solverFor({ variables: 1, clauses: [[0]] })).toThrow(RangeError);
  });
});

describe("assumptions", () => {
  it("are respected, and a core of them excludes all models", () => {
    fc.assert(
      fc.property(
        cnfs(9),
        fc.array(fc.array(literals(9), { maxLength: 6 }), { maxLength: 4 }),
        (cnf, rounds) => {
          const solver = solverFor({ ...cnf, variables: 9 });
          const models = modelsOf({ ...cnf, variables: 9 });
          for (const assumptions of rounds) {
            const left = models.filter((model) => assumptions.every((literal) => holds(model, [literal])));
            const answer = solver.solve(new Meter(), assumptions);
            expect(answer).toBe(left.length > 0 ? "satisfiable" : "unsatisfiable");
            if (answer === "satisfiable") expect(left).toContain(foundAssignment(solver));
            else {
              const core = solver.core();
              expect(assumptions).toEqual(expect.arrayContaining([...core]));
              expect(models.filter((model) => core.every((literal) => holds(model, [literal])))).toEqual([]);
            }
          }
        },
      ),
      options(1500),
    );
  });

  it("that have nothing to do with the contradiction stay out of the core", () => {
    // 1 → 2 → 3, and 4, 5 are free.
    const solver = solverFor({
      variables: 5,
      clauses: [
        [-1, 2],
        [-2, 3],
      ],
    });
    expect(solver.solve(new Meter(), [4, 1, 5, -3])).toBe("unsatisfiable");
    expect([...solver.core()].sort()).toEqual([-3, 1]);
    expect(solver.solve(new Meter(), [4, 1, 5])).toBe("satisfiable");
    expect(solver.solve(new Meter(), [4, -4])).toBe("unsatisfiable");
    expect([...solver.core()].sort()).toEqual([-4, 4]);
  });
});

describe("enumeration", () => {
  it("gives each assignment that extends to a model once, and leaves the solver as it was", () => {
    const cases = cnfs(10).chain((cnf) =>
      fc.tuple(fc.constant(cnf), fc.shuffledSubarray(Array.from({ length: cnf.variables }, (_, i) => i + 1))),
    );
    fc.assert(
      fc.property(cases, ([cnf, over]) => {
        const solver = solverFor(cnf);
        const models = modelsOf(cnf);
        expect(enumerated(solver, over).sort()).toEqual(projections(models, over));
        expect(solver.solve(new Meter())).toBe(models.length > 0 ? "satisfiable" : "unsatisfiable");
        const all = Array.from({ length: cnf.variables }, (_, i) => i + 1);
        expect(enumerated(solver, all).sort()).toEqual(projections(models, all));
      }),
      options(1500),
    );
  });

  it("does so through many conflicts and reductions of the learned clauses", () => {
    // A pigeonhole that the variable `choice` switches off, and three free variables, not all false.
    const hard = pigeonhole(7);
    const choice = hard.variables + 1;
    const free = [choice + 1, choice + 2, choice + 3];
    const cnf: Cnf = {
      variables: choice + 3,
      clauses: [...hard.clauses.map((clause) => [...clause, choice]), free],
    };
    const solver = solverFor(cnf);
    const found = enumerated(solver, [...free, choice], new Meter(1_000_000));
    expect(found.length).toBe(7);
    expect(new Set(found).size).toBe(7);
    expect(solver.counts.conflicts).toBeGreaterThan(1500);
  });

  it("stops when told to, and can begin again", () => {
    const solver = solverFor({ variables: 4, clauses: [[1, 2]] });
    let seen = 0;
    expect(solver.enumerate(new Meter(), [1, 2, 3, 4], () => ++seen < 5)).toBe("stopped");
    expect(seen).toBe(5);
    expect(enumerated(solver, [1, 2, 3, 4]).length).toBe(12);
    expect(enumerated(solver, []).length).toBe(1);
  });

  // OEIS A001035, labelled partial orders; A006905, transitive relations; A000110, equivalences; A002416, all.
  const closed = (n: number, i: number, j: number, k: number): Clause => [
    -at(n, i, j),
    -at(n, j, k),
    at(n, i, k),
  ];
  const at = (n: number, i: number, j: number) => i * n + j + 1;
  function relations(
    n: number,
    property: (i: number, j: number) => readonly Clause[],
    isTransitive = true,
  ): number {
    const points = Array.from({ length: n }, (_, i) => i);
    const clauses = points.flatMap((i) =>
      points.flatMap((j) => [
        ...property(at(n, i, j), at(n, j, i)),
        ...(isTransitive ? points.map((k) => closed(n, i, j, k)) : []),
      ]),
    );
    const variables = Array.from({ length: n * n }, (_, i) => i + 1);
    return enumerated(solverFor({ variables: n * n, clauses }), variables, new Meter(10_000_000)).length;
  }
  it.each([
    [
      "partial orders (A001035)",
      [1, 3, 19, 219, 4231, 130023],
      (own: number, back: number) => (own === back ? [[own]] : [[-own, -back]]),
    ],
    ["transitive relations (A006905)", [2, 13, 171, 3994], () => []],
    [
      "equivalences (A000110)",
      [1, 2, 5, 15, 52, 203, 877],
      (own: number, back: number) => (own === back ? [[own]] : [[-own, back]]),
    ],
  ] as const)("counts %s", (_, counts, property) => {
    expect(counts.map((_, index) => relations(index + 1, property))).toEqual(counts);
  });
  it("counts all relations (A002416)", () => {
    expect([1, 2, 3, 4].map((n) => relations(n, () => [], false))).toEqual([2, 16, 512, 65536]);
  });
});

describe("what is derived", () => {
  it("follows by unit propagation, down to the empty clause or the core", () => {
    const record = (cnf: Cnf, assumptions: readonly number[], enumerate: boolean) => {
      const proof: ProofLine[] = [];
      const solver = solverFor(
        cnf,
        new Solver({
          observer: {
            onDerived: (clause) => proof.push({ kind: "derived", clause }),
            onDeleted: (clause) => proof.push({ kind: "deleted", clause }),
          },
        }),
      );
      if (enumerate) enumerated(solver, [1, 2, 3].slice(0, cnf.variables));
      const answer = solver.solve(new Meter(), assumptions);
      return { proof, answer, core: solver.core() };
    };
    fc.assert(
      fc.property(
        cnfs(12, 3),
        fc.array(literals(12), { maxLength: 4 }),
        fc.boolean(),
        (random, assumptions, first) => {
          const cnf = { ...random, variables: 12 };
          const { proof, answer, core } = record(cnf, assumptions, first);
          expect(firstBadLine(cnf.clauses, proof)).toBe(-1);
          if (answer !== "unsatisfiable") return;
          const negated = core.map((literal) => -literal).sort((a, b) => a - b);
          const derived = proof
            .filter((line) => line.kind === "derived")
            .map((line) => [...line.clause].sort((a, b) => a - b));
          expect(derived).toContainEqual(negated);
        },
      ),
      options(600),
    );
    const hard = record(pigeonhole(6), [], false);
    expect(hard.answer).toBe("unsatisfiable");
    expect(firstBadLine(pigeonhole(6).clauses, hard.proof)).toBe(-1);
    expect(hard.proof.at(-1)).toEqual({ kind: "derived", clause: [] });
  });

  it("is rejected by the checker when a line is spoiled", () => {
    const given: Clause[] = [
      [1, 2],
      [1, -2],
      [-1, 3],
    ];
    expect(
      firstBadLine(given, [
        { kind: "derived", clause: [1] },
        { kind: "derived", clause: [3] },
      ]),
    ).toBe(-1);
    expect(firstBadLine(given, [{ kind: "derived", clause: [-3] }])).toBe(0);
    expect(
      firstBadLine(given, [
        { kind: "deleted", clause: [1, 2] },
        { kind: "derived", clause: [1] },
      ]),
    ).toBe(1);
    expect(firstBadLine(given, [{ kind: "deleted", clause: [2, 3] }])).toBe(0);
  });
});

describe("bounds", () => {
  const run = (meter: Meter) => {
    const solver = solverFor(pigeonhole(8));
    const answer = solver.solve(meter);
    return { answer, ended: meter.ended, steps: meter.steps, counts: solver.counts };
  };

  it("spend the same steps on the same question", () => {
    const first = run(new Meter(1_000_000));
    expect(first.answer).toBe("unsatisfiable");
    expect(run(new Meter(1_000_000))).toEqual(first);
    expect(first.steps).toBe(Math.ceil(first.counts.visits / 1000));
  });

  it("end a search that is too long, at the same place each time, and it can go on", () => {
    const first = run(new Meter(100));
    expect(first).toMatchObject({ answer: "ended", ended: "budget", steps: 100 });
    expect(run(new Meter(100))).toEqual(first);
    const solver = solverFor(pigeonhole(6));
    let rounds = 0;
    while (solver.solve(new Meter(20)) === "ended") rounds += 1;
    expect(rounds).toBeGreaterThan(2);
    expect(solver.solve(new Meter(20))).toBe("unsatisfiable");
  });

  it("end an enumeration in the same way", () => {
    const variables = Array.from({ length: 20 }, (_, i) => i + 1);
    const count = (meter: Meter) => {
      let seen = 0;
      const end = solverFor({ variables: 20, clauses: [[1, 2]] }).enumerate(meter, variables, () => {
        seen += 1;
        return true;
      });
      return { end, seen, ended: meter.ended };
    };
    const first = count(new Meter(50));
    expect(first).toMatchObject({ end: "ended", ended: "budget" });
    expect(first.seen).toBeGreaterThan(1000);
    expect(count(new Meter(50))).toEqual(first);
  });

  it("let the user interrupt within a few thousand visits", () => {
    let asked = 0;
    const meter = new Meter(1_000_000, () => ++asked > 10);
    const solver = solverFor(pigeonhole(9));
    expect(solver.solve(meter)).toBe("ended");
    expect(meter.ended).toBe("interrupted");
    // A look at least every 4,096 visits and the longest watch list.
    expect(solver.counts.visits).toBeLessThan(11 * 10_000);
    expect(solver.solve(meter)).toBe("ended");
    expect(solver.enumerate(meter, [1], () => true)).toBe("ended");
  });

  it("count the literals in memory", () => {
    const full = solverFor(pigeonhole(8), new Solver({ mostLiterals: 100 }));
    const meter = new Meter(1_000_000);
    expect(full.solve(meter)).toBe("ended");
    expect(meter.ended).toBe("memory");
    const given = solverFor(pigeonhole(9)).counts.literals;
    const tight = () => {
      const solver = solverFor(pigeonhole(9), new Solver({ mostLiterals: given + 500 }));
      const spent = new Meter(1_000_000);
      return { answer: solver.solve(spent), ended: spent.ended, counts: solver.counts };
    };
    const first = tight();
    expect(first).toMatchObject({ answer: "ended", ended: "memory" });
    expect(first.counts.literals).toBeGreaterThan(given);
    expect(tight()).toEqual(first);
  });
});
