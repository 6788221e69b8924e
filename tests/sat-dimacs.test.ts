/** Reading and printing DIMACS CNF. */
import fc from "fast-check";
import { describe, expect, it } from "vitest";
import { printDimacs, readDimacs } from "../lib/structures/sat/dimacs.ts";
import { cnfs } from "./support/sat-check.ts";

const seed = Number(process.env.TWOPLACE_SEED ?? 20261201);

/** The code and line of each problem. */
function problemsOf(text: string): (readonly [string, number])[] {
  const result = readDimacs(text);
  return "problems" in result ? result.problems.map(({ code, line }) => [code, line] as const) : [];
}

describe("DIMACS", () => {
  it("prints what it reads", () => {
    fc.assert(
      fc.property(cnfs(20), ({ variables, clauses }) => {
        const text = printDimacs(variables, clauses, ["one", "two\nthree"]);
        expect(readDimacs(text)).toEqual({
          cnf: { variableCount: variables, clauses, comments: ["one", "two", "three"] },
        });
      }),
      { seed, numRuns: 200, verbose: 1 },
    );
  });

  it("reads clauses over several lines, several to a line, and the end mark of SATLIB", () => {
    const text = "c a comment\r\np  cnf 3 3\r\n1 -2\r\n3 0 -1\r\n0 0\r\n%\r\n0\r\n";
    expect(readDimacs(text)).toEqual({
      cnf: { variableCount: 3, clauses: [[1, -2, 3], [-1], []], comments: ["a comment"] },
    });
    expect(printDimacs(0, [])).toBe("p cnf 0 0\n");
  });

  it("names every problem with its line", () => {
    expect(problemsOf("")).toEqual([["no-header", 1]]);
    expect(problemsOf("1 2 0\n")).toEqual([["no-header", 1]]);
    expect(problemsOf("p cnf 2\n1 0\n")).toEqual([["bad-header", 1]]);
    expect(problemsOf("p cnf 2 1\np cnf 2 1\n1 0\n")).toEqual([["header-twice", 2]]);
    expect(problemsOf("p cnf 2 2\n1 x 0\n\n3 -9 0\n")).toEqual([
      ["not-a-literal", 2],
      ["variable-out-of-range", 4],
      ["variable-out-of-range", 4],
    ]);
    expect(problemsOf("p cnf 2 1\n1 1.5 0\n")).toEqual([["not-a-literal", 2]]);
    expect(problemsOf("p cnf 2 2\n1 0\n2\n1")).toEqual([["unfinished-clause", 3]]);
    expect(problemsOf("p cnf 2 2\n1 0\n")).toEqual([["clause-count-differs", 1]]);
    expect(problemsOf(`p cnf 1 1\n${"x ".repeat(100_000)}`).length).toBe(20);
    expect(readDimacs("p cnf 2 1\n7 0\n")).toEqual({
      problems: [{ code: "variable-out-of-range", message: "variable 7 in a text of 2 variables", line: 2 }],
    });
  });
});
