/**
 * The clauses of whole searches, with the search's own breaking of symmetry, printed as DIMACS and given to Debian's
 * `minisat`: on every size the answer must be the same. The questions are those of claims.json and questions.json.
 */
import { mkdtempSync, rmSync, writeFileSync } from "node:fs";
import { tmpdir } from "node:os";
import { join } from "node:path";
import { afterAll, beforeAll, describe, expect, it } from "vitest";
import { Points } from "../lib/carriers/points.ts";
import { not } from "../lib/logic/formula.ts";
import { Meter } from "../lib/logic/meter.ts";
import { signatureOf } from "../lib/logic/theory.ts";
import { printDimacs, readDimacs } from "../lib/structures/sat/dimacs.ts";
import { findStructure, layOut } from "../lib/structures/search.ts";
import { claims, questions, readSentences } from "./support/corpora.ts";
import { hasNativeSolver, NATIVE_PACKAGE, solveNatively } from "./support/sat-native.ts";

const available = hasNativeSolver();
const SIZES = [1, 2, 3, 4];
let folder: string;

beforeAll(() => {
  folder = mkdtempSync(join(tmpdir(), "twoplace-"));
});
afterAll(() => rmSync(folder, { recursive: true }));

it.runIf(process.env.CI !== undefined)(`${NATIVE_PACKAGE} is installed`, () => expect(available).toBe(true));

describe.skipIf(!available)(`searches, by ${NATIVE_PACKAGE} (skipped without that package)`, () => {
  it.each([...claims, ...questions].map((entry) => [entry.id, entry] as const))("%s", (_, entry) => {
    const [conclusion, ...premises] = readSentences([entry.conclusion, ...entry.premises]);
    const sentences = [...premises, not(conclusion!)];
    const { relations } = signatureOf(sentences, { name: "R", places: 2, infix: false });
    for (const size of SIZES) {
      const task = { carrier: new Points(size), sentences, relations };
      const meter = new Meter(20_000);
      const ours = findStructure(task, meter);
      if (ours.result === "ended") continue;
      const clauses: number[][] = [];
      let variables = 0;
      const sink = {
        newVariable: () => ++variables,
        addClause: (literals: readonly number[]) => clauses.push([...literals]),
      };
      layOut(task, sink, new Meter(20_000));
      const text = printDimacs(variables, clauses, [`${entry.id} on ${size}`]);
      expect(readDimacs(text)).toMatchObject({ cnf: { variableCount: variables, clauses } });
      const file = join(folder, "search.cnf");
      writeFileSync(file, text);
      expect(solveNatively(file), `on ${size} points`).toBe(
        ours.result === "found" ? "satisfiable" : "unsatisfiable",
      );
    }
  });
});
