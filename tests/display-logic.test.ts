/** What is shown of normal forms, of texts for other programs, and of named properties. */
import temml from "temml";
import { beforeAll, describe, expect, it } from "vitest";
import { dataOf } from "../kernel/display/data.ts";
import { showDescription } from "../kernel/display/definitions.ts";
import { prepareDrawing } from "../kernel/display/drawing.ts";
import { propertyStatus } from "../kernel/display/findings.ts";
import { normalFormData, showNormalForm } from "../kernel/display/normal-forms.ts";
import { showUnwritten, showWritten, writtenData } from "../kernel/display/written.ts";
import { EVIDENCE_FORMAT, EVIDENCE_VERSION, type Evidence } from "../lib/evidence/format.ts";
import type { Findings, ModelSearch, PropertyFinding } from "../lib/inquiry/examine.ts";
import { parseCell } from "../lib/language/parser.ts";
import { emptyScope, type Statement, type StatementKind } from "../lib/language/statements.ts";
import { normalise } from "../lib/logic/normal-forms/normalise.ts";
import { DEFAULT_LIMITS } from "../lib/logic/normal-forms/result.ts";
import { checkBundle } from "./support/bundles.ts";
import { readMarkup } from "./support/markup.ts";

beforeAll(prepareDrawing);

function stated<Kind extends StatementKind>(text: string, kind: Kind): Statement & { readonly kind: Kind } {
  const { statements, diagnostics } = parseCell(text, emptyScope);
  expect(diagnostics).toEqual([]);
  const statement = statements.at(-1)!;
  if (statement.kind !== kind) throw new Error(`${text} is ${statement.kind}`);
  return statement as Statement & { readonly kind: Kind };
}

function shownForm(text: string, limits = DEFAULT_LIMITS) {
  const statement = stated(text, "normalise");
  const result = normalise(statement.subject.formula, statement.form, limits);
  const shown = showNormalForm(statement, result);
  expect(showNormalForm(statement, result)).toEqual(shown);
  checkBundle(shown.data);
  // Every piece of mathematics is read by a typesetter that is not ours.
  for (const [, math] of shown.data["text/latex"]!.matchAll(/\$([^$]+)\$/g))
    temml.renderToString(math!, { throwOnError: true });
  return {
    ...shown,
    plain: shown.data["text/plain"]!,
    data: normalFormData(statement, result) as Record<string, never>,
  };
}

const between = "∀x ∀y (Rxy → ∃z (Rxz ∧ Rzy))";

describe("normal forms", () => {
  it.each(["negation", "prenex", "miniscoped", "Skolem", "clause", "definitional clause", "disjunctive"])(
    "to %s say what they keep, in all forms",
    (form) => {
      for (const formula of [
        between,
        "∀x (∃y Rxy ↔ ∀z Rzx)",
        "¬∀x ∃y (Rxy ∧ x ≠ y)",
        "∃y Rxy ∧ Rxx",
        "⊤",
        "⊥",
      ])
        for (const steps of ["", " with steps"]) {
          const { summary, plain, data } = shownForm(`normalise ${formula} to ${form}${steps}`);
          expect(summary).toMatch(/^[\w ]+ form, (equivalent|equisatisfiable)/);
          expect(plain).toMatch(/Equivalent: |Equisatisfiable: /);
          expect(summary).toContain(data.keeps);
          expect("steps" in data).toBe(steps !== "");
        }
    },
  );

  it("are one formula in the ASCII spelling, which reads back", () => {
    const { data, plain } = shownForm(`normalise ${between} to negation`);
    expect(data.formula).toBe("forall x y. ~R(x,y) | exists z. R(x,z) & R(z,y)");
    expect(plain).toContain("∀x ∀y (¬Rxy ∨ ∃z (Rxz ∧ Rzy))");
    expect(parseCell(`define F := ${data.formula}`, emptyScope).diagnostics).toEqual([]);
  });

  it("list clauses with their numbers and say where functions come from", () => {
    const { plain, summary, data: result } = shownForm(`normalise ${between} to clause`);
    expect(summary).toBe("clause form, equisatisfiable: 2 clauses, 1 Skolem function");
    expect(plain).toMatch(/^1 +¬Rxy ∨ R\(x, f\(x, y\)\)$/m);
    expect(plain).toMatch(/^f\(x, y\) +z +∃z \(Rxz ∧ Rzy\)$/m);
    expect(result.clauses).toEqual(["~R(x,y) | R(x,f(x,y))", "~R(x,y) | R(f(x,y),y)"]);
    expect(result.functions).toEqual([
      { name: "f", places: 2, variable: "z", origin: "skolem", formula: "exists z. R(x,z) & R(z,y)" },
    ]);
    expect(result.formula).toBe("(forall x y. ~R(x,y) | R(x,f(x,y))) & forall x y. ~R(x,y) | R(f(x,y),y)");
  });

  it("say what free variables become, and what the empty clause and no clauses are", () => {
    expect(shownForm("normalise ∃y Rxy to clause").plain).toMatch(/the free variable x +the whole formula/);
    expect(shownForm("normalise ⊥ to clause").plain).toMatch(/^1 +⊥$/m);
    expect(shownForm("normalise ∀x (Rxx → Rxx) to clause").plain).toContain(
      "no clauses: the formula is valid",
    );
  });

  it("explain definitions with the direction that their clauses say", () => {
    const { plain, summary, data } = shownForm(
      "normalise ∀x ∀y (Rxy ∧ Ryx ∨ Rxx ∧ Ryy ∨ ¬Rxy ∧ ¬Ryx) to definitional clause",
    );
    const definitions = data.definitions as unknown as { direction: string; formula: string }[];
    expect(definitions.length).toBeGreaterThan(0);
    expect(summary).toMatch(/\d definitions?$/);
    for (const { direction } of definitions) expect(direction).toBe("implies");
    expect(plain).toMatch(/^D1\([^)]*\) +implies +/m);
  });

  it("show each step, with the formula as it was given at 0", () => {
    const { plain, data } = shownForm(`normalise ${between} to clause with steps`);
    expect(plain).toMatch(/^0 +as given +∀x ∀y \(Rxy → ∃z \(Rxz ∧ Rzy\)\)$/m);
    const steps = data.steps as unknown as { done: string; keeps: string; formula: string }[];
    steps.forEach(({ done }, index) => {
      expect(plain.replace(/\s+/g, " ")).toContain(`${index + 1} ${done.slice(0, 20)}`);
    });
    expect(steps.at(-1)!.formula).toBe(data.formula);
    expect(steps.some(({ keeps }) => keeps === "equisatisfiable")).toBe(true);
    expect(shownForm("normalise ∀x Rxx to negation with steps").plain).toContain("has this form already");
  });

  it("say why a form was not made, and which one stays small", () => {
    const many = Array.from({ length: 8 }, (_, i) => `(∃x Rxx ∧ ∃y${i} Ry${i}y${i})`).join(" ∨ ");
    const { summary, plain, data } = shownForm(`normalise ${many} to clause`, { parts: 200, levels: 100 });
    expect(summary).toMatch(/^no clause form: /);
    expect(plain).toContain("to definitional clause");
    expect(data).toMatchObject({ formula: null, refused: "form-too-large", limit: 200 });
  });
});

describe("texts for other programs", () => {
  const smt = '(set-logic UF)\n(declare-sort U 0)\n(declare-fun R (U U) Bool)\n(assert (forall ((x U)) (not (R x x))))\n(check-sat)\n'; // biome-ignore format: a text
  const dimacs = "c a comment\np cnf 3 2\n1 -2 0\n2 3 0\n";

  it("are the plain text itself, and stand in the page to be copied", () => {
    const statement = stated("write { ∀x ¬Rxx } as SMT-LIB", "write");
    const { summary, data } = showWritten(statement, smt);
    checkBundle(data);
    expect(`${data["text/plain"]}\n`).toBe(smt);
    expect(readMarkup(data["text/html"]!).text).toContain(smt.trim());
    expect(summary).toBe("{ ∀x ¬Rxx } as SMT-LIB: 2 declarations, 1 assertion");
    expect(writtenData(statement, smt)).toEqual({ format: "smt-lib", size: null, text: smt });
  });

  it("name the size and the numbers of variables and clauses of DIMACS", () => {
    const statement = stated("write { ∀x ¬Rxx } ⊨ ∃x Rxx as DIMACS of size 3", "write");
    const { summary, data } = showWritten(statement, dimacs);
    checkBundle(data);
    expect(summary).toBe("{ ∀x ¬Rxx } ⊨ ∃x Rxx as DIMACS, on 3 points: 3 variables, 2 clauses");
    expect(writtenData(statement, dimacs)).toEqual({ format: "dimacs", size: 3, text: dimacs });
  });

  it("are folded on the page when they are long, and are complete there", () => {
    const long = `p cnf 1 500\n${"1 0\n".repeat(500)}`;
    const { data } = showWritten(stated("write {} as DIMACS of size 2", "write"), long);
    checkBundle(data);
    expect(data["text/html"]).toContain("<details");
    expect(readMarkup(data["text/html"]!).text.match(/1 0/g)).toHaveLength(500);
  });

  it("are text, whatever is in them", () => {
    const hostile = '(declare-fun |</pre><script>alert("1")</script>| () Bool)\n\u001b[31m\u202e\n';
    const { data } = showWritten(stated("write {} as SMT-LIB", "write"), hostile);
    checkBundle(data);
    expect(readMarkup(data["text/html"]!).text).toContain("</pre><script>");
    expect(data["text/plain"]).not.toMatch(/\u202e/);
  });

  it("say why they were not written", () => {
    const statement = stated("write {} as DIMACS of size 90", "write");
    for (const ended of ["budget", "memory", "interrupted"] as const) {
      const { summary, data } = showUnwritten(statement, ended);
      checkBundle(data);
      expect(summary).toMatch(/^\{\} is not written as DIMACS: \w/);
    }
    expect(writtenData(statement, null)).toMatchObject({ text: null });
  });
});

describe("named properties of a theory", () => {
  const found = (size: number): ModelSearch => ({ kind: "found", size });
  const none = (upTo: number): ModelSearch => ({ kind: "none", upTo, decided: null });
  const decided: ModelSearch = {
    kind: "none",
    upTo: 3,
    decided: { points: 3, reason: "Bernays–Schönfinkel–Ramsey class", source: "Ramsey 1930" },
  };
  const property = (name: string, having: ModelSearch, lacking: ModelSearch): PropertyFinding => ({
    name: `${name}(R)`,
    having,
    lacking,
  });
  const findings: Findings = {
    properties: [
      property("irreflexive", found(1), decided),
      property("reflexive", none(4), found(2)),
      property("transitive", found(1), none(4)),
      property("symmetric", found(1), found(2)),
      property("dense", found(1), none(0)),
      property("trichotomous", none(4), none(3)),
    ],
    steps: 10,
    evidence: { format: EVIDENCE_FORMAT, version: EVIDENCE_VERSION } as Evidence,
    endedEarly: true,
    interrupted: false,
  };
  const statement = stated("describe { irr: ∀x ¬Rxx }", "describe");

  it("are told apart by what was found, never as implied or excluded", () => {
    expect(findings.properties.map(propertyStatus)).toEqual([
      "no-countermodel",
      "no-example",
      "no-countermodel",
      "neither",
      "unsearched",
      "no-model",
    ]);
    const { data } = showDescription(statement, findings);
    checkBundle(data);
    const plain = data["text/plain"]!;
    for (const line of [
      /^Named properties of R$/m,
      /^no model without it, by a finite check +irreflexive$/m,
      /^no model without it on 1 to 4 points +transitive$/m,
      /^no model with it on 1 to 4 points +reflexive$/m,
      /^no model, with it or without, on 1 to +trichotomous\n3 points$/m,
      /^not searched +dense$/m,
      /^1 property that a model has and another lacks \(checked\), with the points of each\nsymmetric \(1;\s2\)$/m,
      /Finite checks went up to 3 points and decide by a published bound: Bernays/,
      /The budget ended before all/,
    ])
      expect(plain).toMatch(line);
    expect(plain).not.toMatch(/implied|excluded/);
  });

  it("are not said to be checked without evidence", () => {
    const { data } = showDescription(statement, { ...findings, evidence: null });
    expect(data["text/plain"]).not.toContain("checked");
  });

  it("are said of their relations where there are several", () => {
    const two = findings.properties.map((finding, index) =>
      index === 0 ? { ...finding, name: "irreflexive(≺)" } : finding,
    );
    const plain = showDescription(statement, { ...findings, properties: two }).data["text/plain"]!;
    expect(plain).toMatch(/ irreflexive\(≺\)$/m);
    expect(plain).toMatch(/ transitive\(R\)$/m);
  });

  it("are data with the sizes", () => {
    const data = dataOf(statement, null, findings) as { properties: unknown[] };
    expect(data.properties[0]).toEqual({
      property: "irreflexive(R)",
      status: "no-countermodel",
      modelWith: { size: 1, noneUpTo: null, decided: false },
      modelWithout: { size: null, noneUpTo: 3, decided: true },
    });
    expect(data.properties).toHaveLength(6);
    expect(dataOf(statement, null)).not.toHaveProperty("properties");
  });
});
