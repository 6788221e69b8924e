/**
 * What is true in structures over numbers, confirmed by a general solver: z3-solver decides the problems of linear arithmetic
 * with quantifiers that are written for them. It reads what the user would send to any solver.
 */
import { afterAll, beforeAll, describe, expect, it } from "vitest";
import { definitionOf } from "../lib/carriers/definition.ts";
import type { Structure } from "../lib/carriers/structure.ts";
import { checkFinite } from "../lib/inquiry/check-finite.ts";
import { unwatchedWork } from "../lib/inquiry/work.ts";
import { printArithmetic } from "../lib/language/carrier-smt-lib.ts";
import { parseCell } from "../lib/language/parser.ts";
import { emptyScope } from "../lib/language/statements.ts";
import { not } from "../lib/logic/formula.ts";
import { infiniteOnly, readTheory } from "./support/corpora.ts";
import { type Oracle, startOracle } from "./support/z3.ts";

let oracle: Oracle;
beforeAll(async () => {
  oracle = await startOracle();
});
afterAll(() => oracle.close());

/** Milliseconds for one problem. */
const LIMIT = { timeout: 5_000 };

describe("structures found for infinite-only.json, each axiom by z3-solver", () => {
  it("are confirmed on all sets whose structure is over numbers", async () => {
    let confirmed = 0;
    let unknown = 0;
    const sets = new Set<string>();
    for (const { id, axioms } of infiniteOnly) {
      const theory = readTheory(axioms);
      const { model } = checkFinite(theory, unwatchedWork);
      const definition = model === null || "terms" in model ? null : definitionOf(model as Structure);
      if (definition === null) continue;
      for (const { label, formula } of theory.axioms) {
        const text = printArithmetic(definition, formula, label);
        if (text === null) continue;
        const { mistake, answer } = await oracle.read(text, LIMIT, true);
        expect(mistake, `${id} ${label}: ${text}`).toBeNull();
        expect(answer, `${id} ${label}: ${text}`).not.toBe(1);
        if (answer === -1) confirmed += 1;
        else unknown += 1;
        sets.add(id);
        const opposite = printArithmetic(definition, not(formula), label)!;
        expect((await oracle.read(opposite, LIMIT, true)).answer, opposite).not.toBe(-1);
      }
    }
    expect(sets.size).toBeGreaterThanOrEqual(30);
    expect(unknown).toBeLessThanOrEqual(confirmed / 50);
  }, 300_000);
});

describe("structures that cells define", () => {
  const cells: readonly (readonly [string, string, boolean])[] = [
    ["half-line where Rxy iff y = x + 1", "∃x ∀y ¬Ryx", true],
    ["integer-line where Rxy iff y = x + 1", "∃x ∀y ¬Ryx", false],
    ["half-line where Rxy iff x + 2 <= y", "∀x ∃y (x ≠ y ∧ ¬Rxy ∧ ¬Ryx)", true],
    [
      "2 copies of dense-line where Rxy iff copy(x) = 1 and copy(y) = 2 and x.1 < y.1",
      "∀x ∃y (Rxy ∨ Ryx)",
      true,
    ],
    ["2 copies of integer-line where Rxy iff copy(x) = 2 and x = y", "∀x ∀y (Rxy → x = y)", true],
    ["half-line where Rxy iff x = 0 or y < 2", "∃x ∀y Rxy", true],
  ];
  it.each(cells)("%s: %s is %s", async (structure, sentence, expected) => {
    const cell = parseCell(`write ${structure} ⊨ ${sentence} as SMT-LIB`, emptyScope);
    const statement = cell.statements[0]!;
    if (statement.kind !== "write" || statement.subject.kind !== "structure") throw new Error(structure);
    const { structure: named, sentences } = statement.subject;
    const text = printArithmetic(named.structure, sentences[0]!.formula, "it")!;
    const { mistake, answer } = await oracle.read(text, LIMIT, true);
    expect(mistake, text).toBeNull();
    expect(answer, text).toBe(expected ? -1 : 1);
  });
});
