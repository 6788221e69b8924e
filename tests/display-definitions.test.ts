/** What is shown for definitions, hostile names and values in sentences; text of cells that reads back. */
import fc from "fast-check";
import { Marked } from "marked";
import temml from "temml";
import { beforeAll, describe, expect, it } from "vitest";
import { showAnswer } from "../kernel/display/answers.ts";
import { code } from "../kernel/display/blocks.ts";
import { showInline, showProgress } from "../kernel/display/bundle.ts";
import { dataOf } from "../kernel/display/data.ts";
import { showDefinition, showDescription } from "../kernel/display/definitions.ts";
import { prepareDrawing } from "../kernel/display/drawing.ts";
import {
  inlineFormula,
  inlineNumber,
  inlineStructure,
  inlineText,
  inlineTheory,
  inlineVerdict,
} from "../kernel/display/inline.ts";
import { sourceOf } from "../kernel/display/structures.ts";
import { buildStructure } from "../lib/carriers/defined.ts";
import { recordStructure } from "../lib/carriers/structure-record.ts";
import { parseCell } from "../lib/language/parser.ts";
import { emptyScope, type NamedTheory, type Scope, type Statement } from "../lib/language/statements.ts";
import { MAX_AXIOMS } from "../lib/language/theories.ts";
import { atom, exists, type RelationSymbol } from "../lib/logic/formula.ts";
import { checkBundle } from "./support/bundles.ts";
import {
  between,
  chains,
  claimAnswer,
  conclusion,
  deep,
  entails,
  evidence,
  found,
  irr,
  order,
  R,
  reported,
  searched,
  serial,
  stated,
  structureOf,
  theoryOf,
} from "./support/display-fixtures.ts";
import { readMarkup } from "./support/markup.ts";

beforeAll(prepareDrawing);

describe("text of cells", () => {
  const scope: Scope = { ...emptyScope, declared: [R, between, deep, { name: "≺", places: 2, infix: true }] };

  it("reads back as the structure that it was written for", () => {
    const point = (size: number) => fc.integer({ min: 1, max: size });
    const structures = fc.integer({ min: 1, max: 5 }).chain((size) => {
      const tables = scope.declared.map((relation) =>
        fc
          .array(fc.array(point(size), { minLength: relation.places, maxLength: relation.places }), {
            maxLength: 12,
          })
          .map((tuples): [RelationSymbol, number[][]] => [relation, tuples]),
      );
      return fc.tuple(...tables).map((all) => structureOf(size, ...all));
    });
    fc.assert(
      fc.property(structures, (structure) => {
        const { statements, diagnostics } = parseCell(`define A := ${sourceOf(structure)}`, scope);
        expect(diagnostics).toEqual([]);
        const [statement] = statements;
        if (statement?.kind !== "define" || statement.definition.kind !== "structure")
          throw new Error("no structure");
        expect(recordStructure(buildStructure(statement.definition.structure))).toEqual(
          recordStructure(structure),
        );
      }),
      { seed: 20260404 },
    );
  });
});

describe("hostile names", () => {
  const name = `</code><script>alert("1")</script><img src=x onerror='a'>&amp;\\input{x}$ % # _ ^ ~ {`;
  const relation: RelationSymbol = { name, places: 2, infix: false };
  const other: RelationSymbol = { name: `${name}2`, places: 2, infix: false };
  const mark: RelationSymbol = { name: "<b>&", places: 1, infix: false };
  const structure = structureOf(2, [relation, [[1, 2], [2, 1], [1, 1]]], [other, [[1, 2]]], [mark, [[1]]]); // biome-ignore format: a table
  // Relations in formulas have names that the language can read; everything else may be anything.
  const theory: NamedTheory = { text: name, theory: theoryOf({ [name]: irr }) };

  it("are text in every form", () => {
    const statement = {
      ...stated("claim", { claim: { kind: "consistent", theory } }),
      text: name,
    } as Statement;
    const shown = [
      showAnswer(statement, found(name, structure)).data,
      showAnswer(stated("independence", { theory }), {
        question: "independence",
        verdict: null,
        steps: 1,
        evidence,
        axioms: [
          {
            label: name,
            verdict: "independent",
            witness: structure,
            derivation: null,
            search: searched(),
            report: reported(),
          },
        ],
      }).data,
      showDescription(
        stated("describe", { subject: { kind: "theory", theory } }) as Statement & { kind: "describe" },
      ).data,
      showProgress({ doing: name, steps: 1, limit: 2 }),
    ];
    for (const bundle of shown) {
      checkBundle(bundle);
      expect(readMarkup(bundle["text/html"]!).text).toContain("<script>alert(");
      if (bundle["text/latex"] !== undefined)
        expect(bundle["text/latex"].replace(/\$[^$]*\$/g, "")).not.toMatch(/(?<!textbackslash\{\})\\input/);
    }
  });

  it("cannot turn or hide what follows", () => {
    const statement = { ...stated("claim", { claim: entails }), text: "a\u202eb\u0007c\u0000" } as Statement;
    const { data } = showAnswer(statement, claimAnswer({}));
    for (const form of Object.values(data)) {
      expect(form).toContain("a\ufffdb\ufffdc\ufffd");
      expect(form).not.toMatch(/\u202e|(?!\n)\p{Cc}/u);
    }
  });
});

describe("definitions and descriptions", () => {
  it("confirms a definition in one line", () => {
    const statement = stated("define", {
      definition: { kind: "theory", name: "Order", theory: order.theory },
    });
    const { summary, data } = showDefinition(statement as Statement & { kind: "define" });
    expect(summary).toBe("defined Order: a theory of 2 axioms");
    expect(data["text/plain"]).toBe(summary);
    checkBundle(data);
    expect(dataOf(statement, null)).toEqual({
      kind: "theory",
      name: "Order",
      axioms: [
        { label: "irr", formula: expect.any(String) },
        { label: "trans", formula: expect.any(String) },
      ],
    });
  });

  it("describes a theory with its signature, depth, variables and prefixes", () => {
    const { data } = showDescription(
      stated("describe", { subject: { kind: "theory", theory: chains } }) as Statement & { kind: "describe" },
    );
    checkBundle(data);
    const plain = data["text/plain"]!;
    for (const fact of [
      /^trans +∀∀∀ +∀/m,
      /^signature +R \(2 places\)$/m,
      /^identity += occurs/m,
      /^depth +3$/m,
      /^variables +3: x, y, z$/m,
    ])
      expect(plain).toMatch(fact);
  });

  it("folds the axioms beyond the twelfth", () => {
    const many = Object.fromEntries(Array.from({ length: 40 }, (_, i) => [`axiom${i + 1}`, irr]));
    const theory = { text: "Many", theory: theoryOf(many) };
    const { data } = showDescription(
      stated("describe", { subject: { kind: "theory", theory } }) as Statement & { kind: "describe" },
    );
    checkBundle(data);
    expect(data["text/html"]).toContain("28 more axioms</summary>");
    expect(data["text/plain"]).toContain("axiom40");
    expect(data["text/latex"]).toContain("longtable");
  });

  it("describes a theory of as many axioms as a cell can have", () => {
    const many = Object.fromEntries(Array.from({ length: MAX_AXIOMS }, (_, i) => [`axiom${i + 1}`, irr]));
    const theory = { text: "Many", theory: theoryOf(many) };
    const { summary, data } = showDescription(
      stated("describe", { subject: { kind: "theory", theory } }) as Statement & { kind: "describe" },
    );
    expect(summary).toBe(`Many: a theory of ${MAX_AXIOMS} axioms`);
    expect(data["text/plain"]).toContain(`axiom${MAX_AXIOMS}`);
  });

  it("describes structures, formulas, sentences and relations", () => {
    const subjects = [
      {
        kind: "structure",
        structure: {
          text: "A",
          structure: { carrier: { kind: "points", size: 2 }, relations: [{ relation: R, tuples: [[1, 2]] }] },
        },
      },
      {
        kind: "formula",
        definition: {
          kind: "formula",
          name: "Above",
          parameters: ["x"],
          body: exists("y", atom(R, "y", "x")),
        },
      },
      { kind: "sentence", sentence: conclusion },
      { kind: "relation", relation: between },
    ];
    const summaries = subjects.map((subject) => {
      const { summary, data } = showDescription(
        stated("describe", { subject }) as Statement & { kind: "describe" },
      );
      checkBundle(data);
      return summary;
    });
    expect(summaries).toEqual([
      "A: a structure on 2 points",
      "Above: a formula with 1 parameter",
      "a sentence of depth 2",
      "Between: a relation of 3 places",
    ]);
  });
});

describe("values in sentences", () => {
  it("are short in plain text, Markdown and LaTeX", () => {
    expect(inlineVerdict("open")).toEqual({
      "text/plain": "open",
      "text/markdown": "open",
      "text/latex": "open",
    });
    expect(inlineNumber(130023n)["text/markdown"]).toBe("130,023");
    const formula = inlineFormula(serial);
    expect(formula["text/plain"]).toBe("∀x ∃y Rxy");
    expect(formula["text/markdown"]).toMatch(/^\$\\forall x\\, \\exists y\\, Rxy\$$/);
    expect(formula["text/latex"]).toBe(formula["text/markdown"]);
  });

  it("give theories as mathematics, and structures and what was typed as cell text", () => {
    const { "text/plain": plain, "text/markdown": markdown } = inlineTheory(order.theory);
    expect(plain).toBe("{ irr: ∀x ¬Rxx; trans: ∀x ∀y ∀z (Rxy ∧ Ryz → Rxz) }");
    expect(markdown).toMatch(/^\$\\\{ \\textit\{irr\}/);
    temml.renderToString(markdown!.slice(1, -1), { throwOnError: true });
    expect(inlineText("claim  Order\n is consistent")["text/markdown"]).toBe("`claim Order is consistent`");
    const pair = { carrier: { kind: "points", size: 2 }, relations: [{ relation: R, tuples: [[1, 2]] }] } as const; // biome-ignore format: a table
    expect(inlineStructure(pair)["text/plain"]).toBe("points 2 where R is { (1,2) }");
    const all = Array.from({ length: 900 }, (_, i) => [Math.floor(i / 30) + 1, (i % 30) + 1]);
    const huge = {
      carrier: { kind: "points", size: 30 },
      relations: [{ relation: R, tuples: all }],
    } as const;
    expect(inlineStructure(huge)["text/plain"]).toBe("a structure on 30 points");
  });

  // A reader of Markdown that is not ours gives the text back, and makes nothing else of it.
  it("are text for Markdown, whatever is in them", () => {
    fc.assert(
      fc.property(fc.string({ unit: fc.constantFrom(..."a1 `*_[](){}<>#+!|$~&\\-") }), (text) => {
        const markdown = showInline(text, code(text))["text/markdown"]!;
        const html = new Marked().parseInline(`x${markdown}x`, { async: false });
        const { elements, text: read } = readMarkup(html);
        expect(elements.map(({ name }) => name)).toEqual(text.trim() === "" ? [] : ["code"]);
        if (text.trim() !== "") expect(read.replace(/\s+/g, "")).toBe(`x${text}${text}x`.replace(/\s+/g, ""));
      }),
      { seed: 20260405 },
    );
  });
});
