/** SMT-LIB text: what is printed reads back as the same theory, and the bounds on what is read. */
import fc from "fast-check";
import { describe, expect, test } from "vitest";
import { parseCell } from "../lib/language/parser.ts";
import { MAX_NESTING } from "../lib/language/reader.ts";
import { readSExpressions } from "../lib/language/s-expressions.ts";
import { printSmtLib } from "../lib/language/smt-lib.ts";
import { emptyScope, type Scope, scopeAfter } from "../lib/language/statements.ts";
import type { RelationSymbol } from "../lib/logic/formula.ts";
import { sentencesOf, signatureOf, type Theory, theorySignature } from "../lib/logic/theory.ts";
import { claims, readSentences, theoryOf } from "./support/corpora.ts";
import { sentences } from "./support/random-formulas.ts";

/** Printed by fast-check when a property fails; changed by hand now and then. */
const SEED = 20_240_703;

/** Names that SMT-LIB takes for itself, quotes, or has no letters for. */
const relations: readonly RelationSymbol[] = [
  { name: "R", places: 2, infix: false },
  { name: "P", places: 1, infix: false },
  { name: "Between", places: 3, infix: false },
  { name: "distinct", places: 2, infix: false },
  { name: "xor", places: 2, infix: true },
  { name: "match", places: 1, infix: false },
  { name: "R1'", places: 2, infix: false },
  { name: "≺", places: 2, infix: true },
  { name: "<=", places: 2, infix: true },
  { name: "U", places: 1, infix: false },
  { name: "Ungefähr", places: 2, infix: false },
  { name: "negated", places: 2, infix: false },
];
const scope: Scope = { declared: relations, definitions: new Map() };

const labels = ["R", "irr", "left-total", "mid_2", "assert", "ite", "xor", "a7", "négatif", "x"];

const theories: fc.Arbitrary<Theory> = fc
  .uniqueArray(fc.tuple(fc.constantFrom(...labels), sentences(relations, 3)), {
    maxLength: 5,
    selector: ([label]) => label,
  })
  .map((axioms) => ({
    axioms: axioms.map(([label, formula]) => ({ label, formula, named: label !== "a7" })),
    fallback: null,
  }));

function readBack(text: string, where: Scope): { readonly theory: Theory; readonly scope: Scope } {
  const cell = parseCell(`define Name := smt-lib {\n${text}}`, where);
  expect(cell.diagnostics).toEqual([]);
  const after = cell.statements.reduce(scopeAfter, where);
  const definition = after.definitions.get("Name");
  if (definition?.kind !== "theory") throw new Error("no theory was defined");
  return { theory: definition.theory, scope: after };
}

describe("what is printed reads back", () => {
  test("as the same theory, where the relations are declared", () => {
    fc.assert(
      fc.property(theories, (theory) => {
        expect(readBack(printSmtLib(theory, null), scope).theory.axioms).toEqual(theory.axioms);
      }),
      { seed: SEED, numRuns: 500 },
    );
  });

  test("and declares its relations where they are not", () => {
    fc.assert(
      fc.property(theories, (theory) => {
        const { theory: again, scope: after } = readBack(printSmtLib(theory, null), {
          declared: [{ name: "Other", places: 2, infix: false }],
          definitions: new Map(),
        });
        const plain = (one: Theory) =>
          theorySignature(one).relations.map(({ name, places }) => `${name}/${places}`);
        expect(plain(again)).toEqual(plain(theory));
        expect(after.declared.map(({ name }) => name).sort()).toEqual(
          ["Other", ...theorySignature(theory).relations.map(({ name }) => name)].sort(),
        );
      }),
      { seed: SEED, numRuns: 100 },
    );
  });

  test("a question as a refutation problem", () => {
    fc.assert(
      fc.property(theories, sentences(relations, 2), (theory, conclusion) => {
        const { theory: problem } = readBack(printSmtLib(theory, conclusion), scope);
        expect(problem.axioms).toEqual([
          ...theory.axioms,
          { label: "negated-conclusion", formula: { kind: "not", body: conclusion }, named: true },
        ]);
        expect(signatureOf(sentencesOf(problem), null).relations).toEqual(
          signatureOf([...sentencesOf(theory), conclusion], null).relations,
        );
      }),
      { seed: SEED, numRuns: 200 },
    );
  });

  test("the collected claims", () => {
    for (const { premises, conclusion } of claims) {
      const [goal, ...axioms] = readSentences([conclusion, ...premises]);
      const theory = theoryOf(axioms);
      const { theory: again } = readBack(printSmtLib(theory, goal!), emptyScope);
      expect(again.axioms.slice(0, -1)).toEqual(theory.axioms);
    }
  });

  test("a theory without axioms, with the relation that it is about", () => {
    const text = printSmtLib({ axioms: [], fallback: relations[0]! }, null);
    expect(text).toContain("(declare-fun R (U U) Bool)");
    expect(theorySignature(readBack(text, emptyScope).theory).relations).toEqual([relations[0]]);
  });
});

describe("bounds", () => {
  const codes = (text: string) =>
    parseCell(
      `define T := smt-lib { (declare-sort U 0) (declare-fun R (U U) Bool) ${text} }`,
      emptyScope,
    ).diagnostics.map(({ code }) => code);

  test("nesting, in the text and by let", () => {
    const deep = (depth: number) => `(assert ${"(not ".repeat(depth)}true${")".repeat(depth)})`;
    expect(codes(deep(MAX_NESTING - 10))).toEqual([]);
    expect(codes(deep(MAX_NESTING + 10))).toEqual(["nested-too-deep"]);
    expect(codes(deep(100_000))).toEqual(["nested-too-deep"]);
    const lets = Array.from({ length: 200 }, (_, i) => `(let ((p${i + 1} (not (not (not p${i})))))`);
    expect(codes(`(assert (let ((p0 true)) ${lets.join(" ")} p200${")".repeat(201)})`)).toEqual([
      "nested-too-deep",
    ]);
  });

  test("formulas that double with every let or definition", () => {
    const lets = Array.from({ length: 60 }, (_, i) => `(let ((p${i + 1} (xor p${i} p${i})))`);
    expect(codes(`(assert (let ((p0 true)) ${lets.join(" ")} p60${")".repeat(61)})`)).toEqual([
      "cell-too-large",
    ]);
    const defined = Array.from(
      { length: 60 },
      (_, i) => `(define-fun d${i + 1} ((x U)) Bool (and (or (d${i} x) (d${i} x)) (R x x)))`,
    );
    expect(codes(`(define-fun d0 ((x U)) Bool (R x x)) ${defined.join("\n")}`)).toEqual(["cell-too-large"]);
    const chosen = "(ite true ".repeat(60) + "true" + " false)".repeat(60);
    expect(codes(`(assert ${chosen})`)).toEqual([]);
  });

  test("many axioms, long lists, a megabyte", () => {
    expect(codes("(assert true)".repeat(501))).toEqual(["theory-too-large"]);
    expect(codes(`(assert (and ${"true ".repeat(200_000)}))`)).toEqual([]);
    expect(codes("; a comment with { braces\n".repeat(40_000))).toEqual([]);
    expect(codes(`(assert (exists (${"(x U)".repeat(200_000)}) true))`)).toEqual(["nested-too-deep"]);
    const bindings = Array.from({ length: 30_000 }, (_, i) => `(p${i} true)`);
    expect(
      codes(`(assert (let (${bindings.join("")}) (and ${bindings.map((_, i) => `p${i}`).join(" ")})))`),
    ).toEqual([]);
    const quantified = Array.from({ length: 30_000 }, (_, i) => `(exists ((v!${i} U)) (R v!${i} v!${i}))`);
    expect(codes(`(assert (let (${bindings.join("")}) (or ${quantified.join(" ")})))`)).toEqual([]);
  });
});

test("any text comes to expressions or problems inside it, and to no exception", () => {
  const piece = fc.constantFrom(
    ...'( ( ( ) ) ; | " : :named ! assert forall exists let and => = distinct x y R U Bool true 1 0.5 #x1F #b'.split(
      " ",
    ),
    ...["(declare-sort U 0)", "(declare-fun R (U U) Bool)", "\n", " ", "{", "é", "𝔸", "|a b|", "((x U))"],
  );
  const garbage = fc.array(piece, { maxLength: 40 }).map((parts) => parts.join(" "));
  fc.assert(
    fc.property(garbage, (text) => {
      const { expressions, problems } = readSExpressions(text);
      for (const { start, end } of [...expressions, ...problems])
        expect(0 <= start && start < end && end <= text.length).toBe(true);
      const cell = `define T := smt-lib { (declare-sort U 0) (declare-fun R (U U) Bool) ${text} }`;
      const { statements, diagnostics } = parseCell(cell, emptyScope);
      expect(statements.length === 0 || diagnostics.length === 0).toBe(true);
      for (const { from, to, message } of diagnostics) {
        expect(0 <= from && from <= to && to <= [...cell].length).toBe(true);
        expect(message).not.toMatch(/undefined|\[object/);
      }
    }),
    { seed: SEED, numRuns: 3000 },
  );
});
