/** The propositional solver against other solvers, on encodings of structures and on random clauses. */
import { mkdtempSync, rmSync, writeFileSync } from "node:fs";
import { createRequire } from "node:module";
import { tmpdir } from "node:os";
import { join } from "node:path";
import fc from "fast-check";
import { afterAll, describe, expect, it, vi } from "vitest";
import { Meter } from "../lib/logic/meter.ts";
import { printDimacs, readDimacs } from "../lib/structures/sat/dimacs.ts";
import { type Cnf, cnfs, literals, solverFor } from "./support/sat-check.ts";
import { encode, encodings } from "./support/sat-encodings.ts";
import { hasNativeSolver, NATIVE_PACKAGE, solveNatively } from "./support/sat-native.ts";

const seed = Number(process.env.TWOPLACE_SEED ?? 20261201);

/** Three-literal clauses near the threshold where about half of the sets are satisfiable (common practice: 4.26). */
const threshold: fc.Arbitrary<Cnf> = fc.integer({ min: 20, max: 120 }).chain((variables) =>
  fc.record({
    variables: fc.constant(variables),
    clauses: fc.array(fc.array(literals(variables), { minLength: 3, maxLength: 3 }), {
      minLength: Math.floor(variables * 4.1),
      maxLength: Math.ceil(variables * 4.5),
    }),
  }),
);

function answerOf(cnf: Cnf): string {
  const solver = solverFor(cnf);
  const answer = solver.solve(new Meter(10_000_000));
  if (answer === "satisfiable")
    for (const clause of cnf.clauses)
      expect(clause.some((literal) => solver.value(Math.abs(literal)) === literal > 0)).toBe(true);
  return answer;
}

describe("encodings of structures", () => {
  it.each(encodings.map((encoding) => [`${encoding.name} on ${encoding.points}`, encoding] as const))(
    "%s",
    (_, encoding) => {
      const { variableCount, clauses } = encode(encoding);
      const answer = answerOf({ variables: variableCount, clauses });
      if (encoding.expected !== null)
        expect(answer, encoding.expected.because).toBe(
          encoding.expected.satisfiable ? "satisfiable" : "unsatisfiable",
        );
      else expect(answer).not.toBe("ended");
    },
  );
});

describe("against clingo", () => {
  /** Clauses as a logic program: a choice for each variable, a constraint for each clause. */
  function program({ variables, clauses }: Cnf): string {
    const lines = [`{v(1..${variables})}.`];
    for (const clause of clauses)
      lines.push(`:- ${clause.map((l) => (l > 0 ? `not v(${l})` : `v(${-l})`)).join(", ")}.`);
    return lines.join("\n");
  }

  // A CommonJS module whose types claim named exports.
  const clingo: typeof import("clingo-wasm") = createRequire(import.meta.url)("clingo-wasm");

  /** A fresh instance: one that has met too long an input stays broken. */
  async function freshRun() {
    const quiet = vi.spyOn(console, "info").mockImplementation(() => {});
    const loud = vi.spyOn(console, "log").mockImplementation(() => {});
    const run = await clingo.init({ singleThreaded: true });
    quiet.mockRestore();
    loud.mockRestore();
    return (cnf: Cnf, models = 1) => {
      const result = run(program(cnf), models);
      if (result.Result === "ERROR") throw new Error(result.Error);
      return result;
    };
  }

  const words: Record<string, string> = { satisfiable: "SATISFIABLE", unsatisfiable: "UNSATISFIABLE" };

  it("random clauses", async () => {
    const clingoAnswer = await freshRun();
    fc.assert(
      fc.property(fc.oneof(cnfs(40), threshold), (cnf) => {
        expect(clingoAnswer(cnf).Result).toBe(words[answerOf(cnf)]);
      }),
      { seed, numRuns: 200, verbose: 1 },
    );
  });

  it("the number of models of random clauses", async () => {
    const few = cnfs(16, 3).map((cnf) => ({
      ...cnf,
      clauses: cnf.clauses.filter((clause) => clause.length > 1),
    }));
    const clingoAnswer = await freshRun();
    fc.assert(
      fc.property(few, (cnf) => {
        const variables = Array.from({ length: cnf.variables }, (_, i) => i + 1);
        let count = 0;
        solverFor(cnf).enumerate(new Meter(1_000_000), variables, () => ++count > 0);
        expect(count).toBe(clingoAnswer(cnf, 0).Models.Number);
      }),
      { seed, numRuns: 60, verbose: 1 },
    );
  });

  // Much longer programs break the WebAssembly build.
  const short = encodings
    .filter((encoding) => encoding.level === "small" && encoding.points <= 8)
    .map((encoding) => [`${encoding.name} on ${encoding.points}`, encode(encoding)] as const)
    .filter(([, { clauses }]) => clauses.length < 30_000);
  it.each(short)("%s", async (_, { variableCount, clauses }) => {
    const cnf = { variables: variableCount, clauses };
    expect((await freshRun())(cnf).Result).toBe(words[answerOf(cnf)]);
  });
});

const native = hasNativeSolver();
if (!native && process.env.CI) {
  it(`needs the Debian package ${NATIVE_PACKAGE}`, () => expect.fail("minisat is not installed"));
}
describe.skipIf(!native)(`against minisat (Debian package ${NATIVE_PACKAGE})`, () => {
  const folder = mkdtempSync(join(tmpdir(), "sat-"));
  const file = join(folder, "problem.cnf");
  afterAll(() => rmSync(folder, { recursive: true }));

  function nativeAnswer({ variables, clauses }: Cnf): string {
    const text = printDimacs(variables, clauses);
    expect(readDimacs(text)).toMatchObject({ cnf: { variableCount: variables, clauses } });
    writeFileSync(file, text);
    return solveNatively(file);
  }

  it("random clauses", () => {
    fc.assert(
      fc.property(fc.oneof(cnfs(60), threshold), (cnf) => {
        expect(answerOf(cnf)).toBe(nativeAnswer(cnf));
      }),
      { seed, numRuns: 300, verbose: 1 },
    );
  });

  const small = encodings.filter((encoding) => encoding.level === "small");
  it.each(small.map((encoding) => [`${encoding.name} on ${encoding.points}`, encoding] as const))(
    "%s",
    (_, encoding) => {
      const { variableCount, clauses } = encode(encoding);
      const cnf = { variables: variableCount, clauses };
      expect(answerOf(cnf)).toBe(nativeAnswer(cnf));
    },
  );
});
