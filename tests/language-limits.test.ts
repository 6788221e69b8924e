/** Cells that are large, deep or no cells at all: one clear mistake or a result, never an exception. */
import fc from "fast-check";
import { describe, expect, test } from "vitest";
import { completeAt, inspectAt, isComplete } from "../lib/language/completion.ts";
import type { Diagnostic } from "../lib/language/diagnostics.ts";
import { readTokens } from "../lib/language/lexer.ts";
import { parseCell, parseFormula } from "../lib/language/parser.ts";
import { printFormula } from "../lib/language/printer.ts";
import { MAX_MISTAKES, MAX_NESTING } from "../lib/language/reader.ts";
import { emptyScope } from "../lib/language/statements.ts";
import { latexSpellings, relationSigns, signs } from "../lib/language/tokens.ts";

const SEED = 20_240_612;
const MEGABYTE = 1_000_000;

function repeat(part: string, length = MEGABYTE): string {
  return part.repeat(Math.ceil(length / part.length));
}

function manyDefinitions(count: number): string {
  return Array.from({ length: count }, (_, index) => `define T${index} := {}`).join("\n");
}

function codesOf(cell: string): readonly string[] {
  return parseCell(cell, emptyScope).diagnostics.map(({ code }) => code);
}

describe("cells of a megabyte that are read", () => {
  test.each([
    ["a wide conjunction", `define A := ∀x ∀y (${repeat("Rxy ∧ ")}Rxx)`, 1],
    ["a wide disjunction in ASCII", `define A := forall x y. ${repeat("R(x,y) | ")}R(x,x)`, 1],
    ["many definitions", manyDefinitions(5000), 5000],
    ["many joins", `define A := {}${repeat(" + {}")}`, 1],
    ["a wide definition on a carrier", `define A := dense-line where Rxy iff ${repeat("x < y ∧ ")}x < y`, 1],
    ["many tuples", `define A := points 3 where R is {${repeat("(1,2),")}(1,2)}`, 1],
    ["a comment", `#${repeat("x")}\ndescribe R`, 1],
    ["blank lines", `${repeat("\n")}describe R`, 1],
  ])("%s", (_, cell, count) => {
    const { statements, diagnostics } = parseCell(cell, emptyScope);
    expect(diagnostics).toEqual([]);
    expect(statements.length).toBe(count);
  });
});

describe("cells of a megabyte that are refused", () => {
  test.each([
    ["axioms without end", `define A := {${repeat("∀x Rxx; ")}}`, ["theory-too-large"]],
    ["more definitions", manyDefinitions(40_000), ["cell-too-large"]],
    ["one word", repeat("a"), ["unknown-statement"]],
    ["a run of one variable", `define A := ∀${repeat("x")} Rxx`, ["variable-twice"]],
    ["a run of characters that are not in the language", repeat("§"), ["unknown-symbol"]],
    ["closing brackets", repeat(")"), ["unmatched-bracket"]],
    ["an argument list without end", `define A := ∀x R(${repeat("x,")}`, ["missing-bracket"]],
    ["comparisons in a row", `define A := ∀x x${repeat(" = x")}`, ["chained"]],
    ["joins of unnamed axioms", `define A := {⊤}${repeat(" + {∀x Rxx}")}`, ["theory-too-large"]],
    ["coordinates without end", `define A := tuples of ${repeat("1, ")}1 over half-line`, ["size-too-large"]],
    ["steps without end", `define A := half-line where Rxy iff y = x${repeat(" + 1")}`, ["size-too-large"]],
    [
      "colours compared without end",
      `define A := dense-line in 100 colours where Rxy iff ${"colour(x) < colour(y) or ".repeat(1_000)}⊤`,
      ["cell-too-large"],
    ],
  ])("%s", (_, cell, codes) => {
    expect(codesOf(cell)).toEqual(codes);
  });

  test.each([
    ["a relation defined again and again", `define A := dense-line where ${repeat("Rxy iff ⊤, ")}Rxy iff ⊥`],
    ["lines that are no statements", repeat("foo\n")],
    ["unknown names", `define A := ${repeat("Quux ∧ ")}⊤`],
    ["groups that do not close", `describe ${repeat("\\mathit{")}`],
  ])("%s: the first mistakes, then a last word", (_, cell) => {
    const codes = codesOf(cell);
    expect(codes.length).toBe(MAX_MISTAKES + 1);
    expect(codes.at(-1)).toBe("too-many-mistakes");
  });
});

describe("nesting", () => {
  const shapes: readonly [string, (depth: number) => string][] = [
    ["brackets", (depth) => `${"(".repeat(depth)}⊤${")".repeat(depth)}`],
    ["brackets that are not closed", (depth) => `${"(".repeat(depth)}⊤`],
    ["negations", (depth) => `${"¬".repeat(depth)}⊤`],
    ["quantifiers", (depth) => `${"∀x ".repeat(depth)}Rxx`],
    ["quantifiers with dots", (depth) => `${"exists x. ".repeat(depth)}R(x,x)`],
    ["one list of variables", (depth) => `∀${Array.from({ length: depth }, (_, i) => `x${i}`).join(" ")} ⊤`],
    ["conditionals", (depth) => `${"⊤ → ".repeat(depth)}⊤`],
    ["biconditionals", (depth) => `${"⊤ ↔ ".repeat(depth)}⊤`],
    ["a mixture", (depth) => `${"¬(∀x Rxx → ".repeat(depth)}⊤${")".repeat(depth)}`],
    ["junctions", (depth) => `${"(⊤ ∧ (⊥ ∨ ".repeat(depth)}⊤${"))".repeat(depth)}`],
  ];

  test.each(shapes)("10,000 %s are one mistake, and so is a megabyte of them", (_, shape) => {
    const text = shape(10_000);
    expect(codesOf(`claim {} ⊨ ${text}`)).toEqual(["nested-too-deep"]);
    expect(codesOf(`define T := { a: ${text}; b: ⊤ }\nclaim T - b ⊨ ⊤`)).toEqual(["nested-too-deep"]);
    const result = parseFormula(text, emptyScope);
    expect("diagnostics" in result && result.diagnostics.map(({ code }) => code)).toEqual([
      "nested-too-deep",
    ]);
    const megabyte = shape(Math.ceil(10_000 * (MEGABYTE / text.length)));
    expect(codesOf(`claim {} ⊨ ${megabyte}`)).toEqual(["nested-too-deep"]);
  });

  test.each(shapes.filter(([name]) => name !== "brackets that are not closed"))(
    "as many %s as are allowed are read and printed",
    (_, shape) => {
      // A mixture opens three levels at once, a junction two.
      const depth = Math.floor(MAX_NESTING / 4);
      const result = parseFormula(shape(depth), emptyScope);
      expect(result).toHaveProperty("formula");
      if ("formula" in result)
        for (const notation of ["unicode", "ascii", "latex"] as const)
          expect(parseFormula(printFormula(result.formula, notation), emptyScope)).toEqual(result);
    },
  );

  const terms: readonly [string, (depth: number) => string][] = [
    ["brackets", (depth) => `${"(".repeat(depth)}R${")".repeat(depth)} = R`],
    ["complements", (depth) => `${"∁".repeat(depth)}R = R`],
    ["converses", (depth) => `R${"⁻¹".repeat(depth)} = R`],
    ["compositions", (depth) => `R${" ∘ R".repeat(depth)} ⊆ R`],
    ["unions in brackets", (depth) => `${"(R ∪ ".repeat(depth)}R${")".repeat(depth)} ⊆ R`],
    ["arguments of a property", (depth) => `transitive(${"co(".repeat(depth)}R${")".repeat(depth)})`],
  ];

  test.each(terms)("of relation terms: %s", (_, shape) => {
    expect(codesOf(`claim {} ⊨ ${shape(10_000)}`)).toEqual(["nested-too-deep"]);
    expect(codesOf(`claim {} ⊨ ${shape(MAX_NESTING / 4)}`)).toEqual([]);
  });

  test("properties of large relations are counted before they are unfolded", () => {
    const wide = `define Wide(x, y) := ${"Rxy ∧ ".repeat(500_000)}Rxy`;
    expect(codesOf(`${wide}\nclaim {} ⊨ n-free(Wide)`)).toEqual(["cell-too-large"]);
  });

  test("theory expressions are bounded too", () => {
    expect(codesOf(`describe ${"(".repeat(10_000)}{}${")".repeat(10_000)}`)).toEqual(["nested-too-deep"]);
    expect(codesOf(`describe ${"converse(".repeat(10_000)}{}`)).toEqual(["nested-too-deep"]);
  });

  const structures: readonly [string, (depth: number) => string][] = [
    ["carriers in brackets", (depth) => `${"(".repeat(depth)}dense-line${")".repeat(depth)}`],
    [
      "carriers in carriers",
      (depth) => `${"points 1 at each point of (".repeat(depth)}half-line${")".repeat(depth)}`,
    ],
    ["formulas", (depth) => `dense-line where Rxy iff ${"(".repeat(depth)}x < y${")".repeat(depth)}`],
    ["negations", (depth) => `dense-line where Rxy iff ${"¬".repeat(depth)}x < y`],
    [
      "parents",
      (depth) =>
        `tree with 1 child where Rxy iff ${"parent(".repeat(depth)}x${")".repeat(depth)} = ${"parent(".repeat(depth)}y${")".repeat(depth)}`,
    ],
  ];

  test.each(structures)("of structures: %s", (_, shape) => {
    expect(codesOf(`describe ${shape(10_000)}`)).toEqual(["nested-too-deep"]);
    expect(codesOf(`claim ${shape(40)} ⊨ ∀x x = x`)).toEqual([]);
  });

  test("definitions cannot nest more deeply than text", () => {
    const chain = Array.from({ length: 600 }, (_, i) => `define A${i + 1} := ¬A${i}`).join("\n");
    expect(codesOf(`define A0 := ∀x Rxx\n${chain}`)).toEqual(["nested-too-deep"]);
  });

  test("definitions cannot grow without bound", () => {
    const formulas = Array.from({ length: 60 }, (_, i) => `define A${i + 1} := A${i} ∧ A${i}`).join("\n");
    expect(codesOf(`define A0 := ∀x Rxx → ⊤\n${formulas}`)).toEqual(["cell-too-large"]);
    const theories = Array.from({ length: 60 }, (_, i) => `define T${i + 1} := T${i} + converse(T${i})`);
    expect(codesOf(`define T0 := { ∀x Rxx → ⊤; ∀x ∃y Rxy }\n${theories.join("\n")}`)).toEqual([
      "theory-too-large",
    ]);
  });
});

describe("any text", () => {
  const pieces = [
    ...signs.flatMap(({ symbol, ascii, latex }) => [symbol, ...ascii, ...latex]),
    ...relationSigns.map(({ symbol }) => symbol),
    ...latexSpellings.map(({ typed }) => typed),
    ...["relation", "define", "describe", "claim", "derive", "compare", "models", "check-finite", "points"],
    ...["of", "size", "where", "is", "has", "up", "to", "within", "steps", "replacing", "by", "converse"],
    ...[
      "transitive",
      "acyclic",
      "connected",
      "finite",
      "total",
      "exactly",
      "at-most",
      "points",
      "id",
      "none",
      "o",
    ],
    ...[
      "count",
      "normalise",
      "write",
      "as",
      "SMT-LIB",
      "DIMACS",
      "with",
      "form",
      "Skolem",
      "(R)",
      "R ∘ R",
      "T ⊨",
    ],
    ...[
      "dense-line",
      "half-line",
      "tuples (a, b) over",
      "2 copies of",
      "sum of",
      "at each point of",
      "in 2 colours",
    ],
    ...[
      "generic graph",
      "tree with 2 children",
      "where Rxy iff",
      "iff",
      "x.1",
      "x.a",
      "colour(x) = 1",
      "parent(x)",
    ],
    ...["x-1", "x + 1 = y", "x < y", "meet(x,", "without zero", "part(x)", "R is {"],
    ...["smt-lib {", "(assert", "|", "(declare-sort U 0)"],
    ...["R", "S", "T", "Rxy", "x", "y", "x1'", "Foo", "before", "1", "2", "0", "2.5", "(x,y)", "T.a", "a:"],
    ...[
      "\n",
      "\n",
      " ",
      " ",
      "#",
      "\t",
      "\\mathit{",
      "}",
      "_{1}",
      "\u0338",
      "\ud835",
      "\udd38",
      "𝔸",
      "é",
      "\0",
    ],
  ];
  const garbage = fc.oneof(
    fc.array(fc.constantFrom(...pieces), { maxLength: 40 }).map((parts) => parts.join("")),
    fc.array(fc.constantFrom(...pieces), { maxLength: 40 }).map((parts) => parts.join(" ")),
    fc.string({ unit: "binary", maxLength: 60 }),
    fc.string({ maxLength: 60 }),
  );

  function expectInside(places: readonly { from: number; to: number }[], length: number): void {
    for (const { from, to } of places) {
      expect(Number.isInteger(from) && Number.isInteger(to)).toBe(true);
      expect(0 <= from && from <= to && to <= length).toBe(true);
    }
  }

  test("has tokens that tile it in order", () => {
    fc.assert(
      fc.property(garbage, (text) => {
        const tokens = readTokens(text);
        expect(tokens.at(-1)?.kind).toBe("end");
        let last = 0;
        for (const { from, to, start, end } of tokens) {
          expect(from >= last && to >= from).toBe(true);
          expect([...text.slice(0, start)].length).toBe(from);
          expect([...text.slice(0, end)].length).toBe(to);
          last = to;
        }
        expect(last).toBe([...text].length);
      }),
      { seed: SEED, numRuns: 2000 },
    );
  });

  test("comes to statements or mistakes with places inside it", () => {
    fc.assert(
      fc.property(garbage, (text) => {
        const { statements, diagnostics } = parseCell(text, emptyScope);
        expect(statements.length === 0 || diagnostics.length === 0).toBe(true);
        expectInside([...statements, ...diagnostics], [...text].length);
        for (const { code, message } of diagnostics) {
          expect(code).toMatch(/^[a-z]+(-[a-z]+)*$/);
          expect(message).not.toMatch(/undefined|null|\[object/);
        }
        const formula = parseFormula(text, emptyScope);
        if ("diagnostics" in formula) expectInside(formula.diagnostics, [...text].length);
      }),
      { seed: SEED, numRuns: 5000 },
    );
  });

  test("can be completed, inspected and asked whether it goes on, at any place", () => {
    fc.assert(
      fc.property(garbage, fc.nat(70), (text, cursor) => {
        const { from, to } = completeAt(text, cursor, emptyScope);
        expectInside([{ from, to }], [...text].length);
        const found = inspectAt(text, cursor, emptyScope);
        if (found !== null) expectInside([found], [...text].length);
        expect(["complete", "incomplete", "invalid"]).toContain(isComplete(text).status);
      }),
      { seed: SEED, numRuns: 2000 },
    );
  });

  test("put after a sound statement, does not reach back into it", () => {
    fc.assert(
      fc.property(garbage, (text) => {
        const before = "define Sound := { a: ∀x Rxx }\n";
        const diagnostics: readonly Diagnostic[] = parseCell(
          `${before}relation ${text}`,
          emptyScope,
        ).diagnostics;
        for (const { from } of diagnostics) expect(from).toBeGreaterThanOrEqual([...before].length);
      }),
      { seed: SEED, numRuns: 1000 },
    );
  });
});
