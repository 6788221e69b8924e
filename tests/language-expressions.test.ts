/** Expressions for sentences of prose. */
import { describe, expect, test } from "vitest";
import { readExpression } from "../lib/language/expressions.ts";
import { parseCell } from "../lib/language/parser.ts";
import { printFormula } from "../lib/language/printer.ts";
import { emptyScope, scopeAfter } from "../lib/language/statements.ts";

const scope = parseCell(
  "define Order := { irr: ∀x ¬Rxx; trans: transitive }\ndefine Above(x, y) := Ryx\ndefine Chain := points 2 where R is { (1,2) }",
  emptyScope,
).statements.reduce(scopeAfter, emptyScope);

function read(text: string) {
  const result = readExpression(text, scope);
  if ("diagnostics" in result) throw new Error(result.diagnostics[0]?.message ?? "no message");
  return result.expression;
}

test("claims by number", () => {
  expect(read("verdict of claim 3")).toEqual({ kind: "verdict", claim: 3 });
  expect(read("reason of claim 4")).toEqual({ kind: "reason", claim: 4 });
  expect(read(" claim 12 ")).toEqual({ kind: "claim", claim: 12 });
});

test("counts", () => {
  expect(read("count of Order - irr on 4 points")).toMatchObject({
    kind: "count",
    size: 4,
    labelled: false,
    theory: { text: "Order - irr", theory: { axioms: [{ label: "trans" }] } },
  });
  expect(read("labelled count of { reflexive } on 1 point")).toMatchObject({
    kind: "count",
    size: 1,
    labelled: true,
  });
});

test("formulas, axioms and definitions", () => {
  const formula = read("formula of Order.irr");
  expect(formula.kind === "formula" && printFormula(formula.formula.formula, "unicode")).toBe("∀x ¬Rxx");
  expect(read("formula of Above(y, z)")).toMatchObject({ kind: "formula", formula: { text: "Above(y, z)" } });
  expect(read("formula of symmetric(R ∘ R)")).toMatchObject({ kind: "formula" });
  expect(read("axioms of Order + { serial }")).toMatchObject({
    kind: "axioms",
    theory: { theory: { axioms: [{ label: "irr" }, { label: "trans" }, { label: "a1" }] } },
  });
  for (const [name, kind] of [
    ["Order", "theory"],
    ["Above", "formula"],
    ["Chain", "structure"],
  ])
    expect(read(name!)).toMatchObject({ kind: "definition", definition: { name, kind } });
});

describe("mistakes are diagnostics", () => {
  test.each([
    ["", "unexpected"],
    ["Ordr", "unknown-name"],
    ["R", "wrong-kind"],
    ["verdict of claim", "unexpected"],
    ["verdict of claim 0", "not-whole"],
    ["verdict of 3", "unexpected"],
    ["reason of 3", "unexpected"],
    ["count of Order", "unexpected"],
    ["count of Order on 4 points today", "unexpected"],
    ["formula of Order", "wrong-kind"],
    ["axioms of Above", "wrong-kind"],
    ["∀x Rxx", "unexpected"],
    ["𝔸 §", "unknown-name"],
  ])("%j: %s", (text, code) => {
    const result = readExpression(text, scope);
    expect("diagnostics" in result && result.diagnostics[0]?.code).toBe(code);
    if ("diagnostics" in result)
      for (const { from, to } of result.diagnostics) {
        expect(from).toBeGreaterThanOrEqual(0);
        expect(to).toBeLessThanOrEqual([...text].length);
      }
  });
});
