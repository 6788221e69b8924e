/**
 * Cells and what they come to, as text. A file in language/cases holds cases one after another:
 *
 *     == title
 *     the cell
 *     ==>
 *     one line for each statement, or for each mistake: `code from-to message | suggestion`
 *
 * `npm run accept` writes what the cells come to now into the files, to be reviewed as a change of the files.
 */
import { readdirSync, readFileSync, writeFileSync } from "node:fs";
import { join } from "node:path";
import { describe, expect, test } from "vitest";
import { completeAt, inspectAt, isComplete } from "../lib/language/completion.ts";
import { editDistance, nearestName } from "../lib/language/nearest.ts";
import { parseCell, parseFormula } from "../lib/language/parser.ts";
import { emptyScope, type Scope, scopeAfter } from "../lib/language/statements.ts";
import { renderCell } from "./language/render.ts";

const folder = join(import.meta.dirname, "language", "cases");
const accepts = process.env.TWOPLACE_ACCEPT === "1";

interface Case {
  readonly title: string;
  readonly cell: string;
  readonly expected: string;
}

function readCases(text: string): readonly Case[] {
  return text
    .split(/^== /m)
    .slice(1)
    .map((part) => {
      const [title] = part.split("\n", 1);
      const [cell, expected] = part.slice(title!.length + 1).split(/^==>\n?/m);
      return { title: title!, cell: cell!.replace(/\n$/, ""), expected: (expected ?? "").trim() };
    });
}

for (const file of readdirSync(folder).sort()) {
  const path = join(folder, file);
  const cases = readCases(readFileSync(path, "utf8"));
  describe(file, () => {
    if (accepts) {
      const text = cases.map(({ title, cell }) => {
        const result = renderCell(parseCell(cell, emptyScope)).join("\n");
        return `== ${title}\n${cell}\n==>\n${result}\n`;
      });
      writeFileSync(path, text.join("\n"));
    }
    test.each(cases)("$title", ({ cell, expected }) => {
      const result = parseCell(cell, emptyScope);
      if (!accepts) expect(renderCell(result).join("\n")).toBe(expected);
      const length = [...cell].length;
      for (const { from, to } of [...result.diagnostics, ...result.statements]) {
        expect(from).toBeGreaterThanOrEqual(0);
        expect(to).toBeGreaterThanOrEqual(from);
        expect(to).toBeLessThanOrEqual(length);
      }
    });
  });
}

test("titles of cases differ", () => {
  const titles = readdirSync(folder).flatMap((file) =>
    readCases(readFileSync(join(folder, file), "utf8")).map(({ title }) => title),
  );
  expect(new Set(titles).size).toBe(titles.length);
});

test("a statement's text and place are its own, comments left out", () => {
  const cell =
    "# 𝔸 first\ndescribe R # one\n\n  define 𝔹 := { # two\n  irr: ∀x ¬Rxx\n  # three\n} ; describe 𝔹";
  const { statements } = parseCell(cell, emptyScope);
  expect(statements.map(({ text }) => text)).toEqual([
    "describe R",
    "define 𝔹 := {\n  irr: ∀x ¬Rxx\n}",
    "describe 𝔹",
  ]);
  const points = [...cell];
  for (const { text, from, to } of statements.filter(({ kind }) => kind === "describe"))
    expect(points.slice(from, to).join("")).toBe(text);
});

test("names bound by earlier cells are kept when they are bound again", () => {
  let scope: Scope = emptyScope;
  const run = (cell: string) => {
    const { statements, diagnostics } = parseCell(cell, scope);
    expect(diagnostics).toEqual([]);
    for (const statement of statements) scope = scopeAfter(scope, statement);
  };
  run("define Order := { irr: ∀x ¬Rxx }");
  run("define Dense := Order + { up: ∀x ∃y Rxy }");
  run("define Order := { }");
  const dense = scope.definitions.get("Dense");
  expect(dense?.kind === "theory" && dense.theory.axioms.map(({ label }) => label)).toEqual(["irr", "up"]);
});

describe("the nearest name", () => {
  // Distances from Damerau's four edits, counted by hand.
  test.each([
    ["Dense", "Dense", 0],
    ["Dnese", "Dense", 1],
    ["dense", "Dense", 0.5],
    ["Dens", "Dense", 1],
    ["Densely", "Dense", 2],
    ["", "abc", 3],
    // The restricted form edits no letter twice: 3, where the unrestricted one has 2.
    ["ca", "abc", 3],
  ])("%s is %s by %d", (from, to, distance) => {
    expect(editDistance(from, to)).toBe(distance);
    expect(editDistance(to, from)).toBe(distance);
  });

  test("is null when none is near, and the first of equally near ones", () => {
    expect(nearestName("Ordr", ["Order", "Dense"])).toBe("Order");
    expect(nearestName("Ordr", ["Dense"])).toBeNull();
    expect(nearestName("Axc", ["Axb", "Axa"])).toBe("Axa");
    expect(nearestName("r", ["S", "R"])).toBe("R");
  });
});

describe("formulas by themselves", () => {
  test("may have free variables if the caller says so", () => {
    expect(parseFormula("Rxy", emptyScope)).toMatchObject({ diagnostics: [{ code: "free-variables" }] });
    expect(parseFormula("Rxy", emptyScope, { freeVariables: true })).toMatchObject({
      formula: { kind: "atom", args: ["x", "y"] },
    });
  });

  test("may stand on several lines", () => {
    expect(parseFormula("∀x\n(Rxx\n∧ Rxx)", emptyScope)).toHaveProperty("formula");
  });

  test("end where they end", () => {
    expect(parseFormula("∀x Rxx ∀y Ryy", emptyScope)).toMatchObject({
      diagnostics: [{ code: "unexpected", from: 7, to: 8 }],
    });
  });
});

const scope: Scope = parseCell(
  "define Order := { irr: ∀x ¬Rxx; trans: ∀x ∀y ∀z (Rxy ∧ Ryz → Rxz) }\ndefine Above(x, y) := Ryx\ndefine Chain := points 2 where R is { (1,2) }",
  emptyScope,
).statements.reduce(scopeAfter, emptyScope);

/** The cursor is written ‸ in these. */
function atCursor(text: string): [string, number] {
  return [text.replace("‸", ""), [...text].indexOf("‸")];
}

describe("completion", () => {
  const proposals = (text: string) => completeAt(...atCursor(text), scope).matches.map((match) => match.text);

  test.each([
    ["\\fora‸", ["∀"]],
    ["claim Order \\mod‸", ["⊨"]],
    ["ch‸", ["check-finite"]],
    ["check-f‸", ["check-finite"]],
    ["describe Order\nmod‸", ["models"]],
    ["claim Ord‸", ["Order"]],
    ["claim Ch‸", ["Chain"]],
    ["compare Order, O‸", ["Order"]],
    ["claim Order is ‸", ["consistent", "equivalent to", "independent", "infinite-only", "weaker than"]],
    ["claim Order is infinite-o‸", ["infinite-only"]],
    ["claim Order is weaker ‸", ["than"]],
    ["claim Order is weaker than ‸", ["Order", "converse", "complement"]],
    ["claim Order has ‸", ["no finite model"]],
    ["claim Order has no ‸", ["finite model"]],
    ["claim Order ⊨ ∀x ∀y Ab‸", ["Above"]],
    ["claim Order ⊨ Order.‸", ["irr", "trans"]],
    ["describe Order - t‸", ["trans"]],
    ["describe Order - trans - ‸", ["irr"]],
    ["check-finite Order replacing i‸", ["irr"]],
    ["check-finite Order up ‸", ["to"]],
    ["check-finite Order u‸", ["up to"]],
    ["check-finite Order up to 5 ‸", ["within"]],
    ["check-finite Order within 50 ‸", ["steps"]],
    ["models Order ‸", ["of size", "replacing", "up to", "within"]],
    ["relation Between ‸", ["infix", "of"]],
    ["relation Between of 3 ‸", ["places"]],
    ["define New := conv‸", ["converse"]],
    ["define New := { irr: fora‸", ["forall"]],
    ["define New := Order + {\n  irr: Abo‸", ["Above"]],
    ["define Pair := points 2 ‸", ["at each point of", "where"]],
    ["define Pair := points 2 where ‸", ["R"]],
    ["define Pair := points 2 where R ‸", ["is", "iff"]],
    ["define Line := dense‸", ["dense-line", "dense-tree", "dense-linear-order-without-endpoints"]],
    ["define Line := dense-line ‸", ["in", "at each point of", "where"]],
    ["define Line := dense-line in 2 ‸", ["colours"]],
    ["define Line := dense-line in 2 colours ‸", ["at each point of", "where"]],
    ["define Line := dense-line where ‸", ["R"]],
    ["define Line := dense-line where Rxy ‸", ["iff"]],
    ["define Line := dense-line in 2 colours where Rxy iff ‸", ["colour", "not", "true", "false"]],
    ["define Line := dense-line where Rxy iff x < y ‸", ["and", "or"]],
    ["define Line := dense-line where Rxy iff x < y, ‸", ["R"]],
    ["claim dense-line where Rxy iff x < y ‸", ["and", "or", "⊨", "⊭"]],
    ["claim dense-line where Rxy iff x < y ⊨ tota‸", ["total-order", "total-preorder"]],
    ["define G := generic ‸", ["graph", "digraph", "tournament", "partial-order"]],
    ["define G := generic graph where Rxy iff ad‸", ["adjacent"]],
    ["define B := boolean-algebra ‸", ["without zero", "without zero and top", "at each point of", "where"]],
    ["define F := rooted ‸", ["tree with"]],
    ["define F := rooted tree with 2 ‸", ["children"]],
    ["define F := tree with 2 children where Rxy iff pa‸", ["parent"]],
    ["define D := 2 ‸", ["copies of"]],
    ["define D := 2 copies of half‸", ["half-line"]],
    ["define T := tuples (from, until) ‸", ["over"]],
    ["define T := tuples (start, end) over half-line where Rxy iff x.‸", ["start", "end"]],
    ["define L := integer-line at ‸", ["each point of"]],
    ["define L := integer-line at each point of dense-line where Rxy iff x.‸", ["outer", "inner"]],
    ["define W := sum of half-line and po‸", ["points"]],
    ["define New := { a: ∀x Rxx }\ncheck-finite N‸", ["New"]],
    ["claim Order ⊨ trans‸", ["transitive"]],
    ["claim Order ⊨ left-eu‸", ["left-euclidean"]],
    ["define New := { acy‸", ["acyclic up to"]],
    ["claim Order ⊨ con‸", ["confluent", "connex", "connected up to"]],
    ["count Order up to 5 with ‸", ["representatives"]],
    ["count Order u‸", ["up to"]],
    ["count Order with‸", ["within", "with representatives"]],
    ["normalise Order.irr to‸", ["tolerance", "total-order", "total-preorder", "tournament"]],
    ["normalise ∀x Rxx to p‸", ["prenex"]],
    ["normalise ∀x Rxx to prenex ‸", ["form", "with steps"]],
    ["normalise ∀x Rxx to prenex form with ‸", ["steps"]],
    ["write Order ‸", ["⊨", "as", "replacing"]],
    ["write Order as ‸", ["SMT-LIB", "DIMACS of size"]],
    ["write Order ⊨ ∀x Rxx as‸", ["asymmetric"]],
    ["define New := smt-lib { (decl‸", []],
    ["# a comment with cl‸", []],
    ["zzz‸", []],
  ])("of %s", (text, expected) => {
    expect(proposals(text)).toEqual(expected);
  });

  test("says what it replaces, in code points, and of which kind each proposal is", () => {
    expect(completeAt(...atCursor("# 𝔸\nclaim Ord‸ is consistent"), scope)).toEqual({
      from: 10,
      to: 13,
      matches: [{ text: "Order", type: "theory" }],
    });
    expect(completeAt("cl", 99, scope)).toMatchObject({ from: 0, to: 2 });
  });
});

describe("inspection", () => {
  const found = (text: string) => inspectAt(...atCursor(text), scope);

  test.each([
    ["check-fi‸nite Order", "statement", "check-finite", "check-finite T"],
    ["check-finite Or‸der", "definition", "Order", "Order"],
    ["describe Order.tr‸ans", "definition", "Order.trans", "Order.trans"],
    ["describe Above‸", "definition", "Above", "Above(x, y)"],
    ["describe Cha‸in", "definition", "Chain", "Chain"],
    ["claim Order ⊨ ∀x R‸xx", "relation", "R", "R(x, y)"],
    ["claim Order ‸⊨ ∀x Rxx", "symbol", "⊨", "⊨  |=  \\models  \\vDash"],
    ["claim Order |= fora‸ll x. Rxx", "symbol", "∀", "∀  forall  \\forall"],
    ["claim Order is cons‸istent", "keyword", "consistent", "T is consistent"],
    ["check-finite Order up‸ to 5", "keyword", "up", "up to n"],
    ["relation ≺ in‸fix", "keyword", "infix", "infix"],
    ["claim Order ⊨ fun‸ctional", "property", "right-unique", "right-unique(R)"],
    ["relation S\ndefine T := { tourna‸ment }", "property", "tournament", "tournament(S)"],
    ["define T := { acy‸clic }", "keyword", "acyclic", "acyclic(R) up to n"],
    ["claim Order ⊨ R ‸∘ R ⊆ R", "symbol", "∘", "∘  o  \\circ"],
    ["claim Order ⊨ R⁻¹‸ = R", "symbol", "⁻¹", "⁻¹  inv  ^-1  ^{-1}"],
    [
      "define Q := dense-li‸ne where Rxy iff x < y",
      "keyword",
      "dense-line",
      "dense-line, dense-line in 2 colours",
    ],
    ["define Q := dense-line where Rxy if‸f x < y", "keyword", "iff", "iff"],
    ["define G := gen‸eric graph", "keyword", "generic", "generic graph"],
    ["define G := generic parti‸al-order", "keyword", "partial-order", "generic partial-order"],
    ["define F := rooted tr‸ee with 2 children", "keyword", "tree", "rooted tree with 2 children"],
    ["define D := 2 copies of half-line where Rxy iff co‸py(x) = 1", "keyword", "copy", "copy(x) = 1"],
    [
      "define L := half-line at ea‸ch point of dense-line",
      "keyword",
      "each",
      "integer-line at each point of dense-line",
    ],
    [
      "define L := half-line at each point of dense-line where Rxy iff x.out‸er < y.outer",
      "keyword",
      "outer",
      "x.outer",
    ],
    ["normalise ∀x Rxx to Sko‸lem", "keyword", "Skolem", "normalise φ to Skolem form"],
    ["normali‸se ∀x Rxx to Skolem", "statement", "normalise", "normalise φ to prenex form with steps"],
    ["relation ≺‸ infix", "relation", "≺", "x ≺ y"],
  ])("of %s", (text, kind, name, signature) => {
    expect(found(text)).toMatchObject({ kind, name, signature });
    expect(found(text)!.meaning).toMatch(/\.$/);
  });

  test("of a structure says what it is on", () => {
    const text = "define Q := dense-line in 2 colours where Rxy iff x < y\ndescribe Q‸";
    expect(found(text)!.meaning).toBe("A structure on the rational line in two colours, each of them dense.");
  });

  test("is null where there is nothing to say", () => {
    for (const text of ["‸", "   ‸", "describe Nothing‸", "check-finite Order up to 5‸"])
      expect(found(text)).toBeNull();
  });
});

describe("whether a cell goes on", () => {
  test.each([
    ["", "complete"],
    ["# only a comment", "complete"],
    ["check-finite Order", "complete"],
    ["chek Order", "complete"],
    ["define Order := {", "incomplete"],
    ["define Order := { irr: (∀x", "incomplete"],
    ["define Order :=", "incomplete"],
    ["compare Order,", "incomplete"],
    ["claim Order ⊨ ∀x Rxx ∧", "incomplete"],
    ["define Q := dense-line where", "incomplete"],
    ["define Q := dense-line where Rxy iff", "incomplete"],
    ["define Q := dense-line where Rxy iff x < y and", "incomplete"],
    ["define Q := dense-line where Rxy iff x < y", "complete"],
    ["claim Order ⊨ ∀x Rxx)", "invalid"],
    ["define Order := { irr: (∀x }", "invalid"],
  ])("%j is %s", (text, status) => {
    expect(isComplete(text).status).toBe(status);
  });

  test("indents by the brackets that are open", () => {
    expect(isComplete("define A := {")).toEqual({ status: "incomplete", indent: "  " });
    expect(isComplete("define A := { (")).toEqual({ status: "incomplete", indent: "    " });
  });
});
