/** What is shown for answers and definitions, in all forms. */
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
import { sourceOf, structureData } from "../kernel/display/structures.ts";
import { buildStructure, type Structure } from "../lib/carriers/structure.ts";
import { EVIDENCE_FORMAT, EVIDENCE_VERSION, type Evidence } from "../lib/evidence/format.ts";
import type { Answer, AxiomAnswer, ClaimAnswer, Search } from "../lib/inquiry/answer.ts";
import { parseCell } from "../lib/language/parser.ts";
import {
  type Claim,
  emptyScope,
  type NamedTheory,
  type Scope,
  type Statement,
  type StatementKind,
} from "../lib/language/statements.ts";
import { MAX_AXIOMS } from "../lib/language/theories.ts";
import {
  and,
  atom,
  equal,
  exists,
  type Formula,
  forall,
  implies,
  not,
  type RelationSymbol,
} from "../lib/logic/formula.ts";
import type { Theory } from "../lib/logic/theory.ts";
import { checkBundle } from "./support/bundles.ts";
import { readMarkup } from "./support/markup.ts";

beforeAll(prepareDrawing);

const R: RelationSymbol = { name: "R", places: 2, infix: false };
const between: RelationSymbol = { name: "Between", places: 3, infix: false };
const deep: RelationSymbol = { name: "Deep", places: 1, infix: false };

const irr = forall("x", not(atom(R, "x", "x")));
const trans = forall(["x", "y", "z"], implies(and(atom(R, "x", "y"), atom(R, "y", "z")), atom(R, "x", "z")));
const unique = forall(["x", "y", "z"], implies(and(atom(R, "x", "y"), atom(R, "x", "z")), equal("y", "z")));
const serial = forall("x", exists("y", atom(R, "x", "y")));

function theoryOf(sentences: Readonly<Record<string, Formula>>): Theory {
  const axioms = Object.entries(sentences).map(([label, formula]) => ({ label, formula, named: true }));
  return { axioms, fallback: R };
}

const order: NamedTheory = { text: "Order", theory: theoryOf({ irr, trans }) };
const chains: NamedTheory = { text: "Chains - last", theory: theoryOf({ trans, unique }) };

function structureOf(size: number, ...tables: [RelationSymbol, number[][]][]): Structure {
  return buildStructure({
    carrier: { kind: "points", size },
    relations: tables.map(([relation, tuples]) => ({ relation, tuples })),
  });
}

const loop = structureOf(1, [R, [[1, 1]]]);
const chain = structureOf(3, [R, [[1, 2], [2, 3], [1, 3]]]); // biome-ignore format: a table
const mixed = structureOf(4, [R, [[1, 2], [2, 3], [3, 1]]], [between, [[1, 2, 3], [3, 2, 1]]], [deep, [[2], [4]]]); // biome-ignore format: a table

/** Evidence of no content: displays ask only whether there is any. */
const evidence = { format: EVIDENCE_FORMAT, version: EVIDENCE_VERSION } as Evidence;

function stated(kind: StatementKind, rest: object, options: object = {}): Statement {
  const text = `${kind} …`;
  return {
    kind,
    text,
    from: 0,
    to: text.length,
    options: { upTo: null, within: null, ...options },
    ...rest,
  } as unknown as Statement;
}

const conclusion = { text: "serial", formula: serial };
const entails: Claim = { kind: "entails", premises: order, conclusion };

function searched(rest: Partial<Search> = {}): Search {
  return {
    sought: "a countermodel",
    noneUpTo: 8,
    foundAt: null,
    ended: null,
    endedAt: null,
    symmetricUpTo: null,
    ...rest,
  };
}

function claimAnswer(rest: Partial<ClaimAnswer>): ClaimAnswer {
  return {
    question: "claim",
    verdict: "open",
    steps: 12345,
    evidence: null,
    structures: [],
    searches: [],
    axioms: null,
    ...rest,
  };
}

function found(role: string, structure: Structure, rest: Partial<ClaimAnswer> = {}): ClaimAnswer {
  return claimAnswer({ verdict: "fails", evidence, structures: [{ role, structure }], ...rest });
}

const axioms: readonly AxiomAnswer[] = [
  { label: "irr", verdict: "independent", witness: loop, search: searched({ noneUpTo: 0, foundAt: 1 }) },
  {
    label: "trans",
    verdict: "open",
    witness: null,
    search: searched({ noneUpTo: 5, ended: "budget", endedAt: 6 }),
  },
];

interface Case {
  readonly name: string;
  readonly statement: Statement;
  readonly answer: Answer;
  readonly summary: string;
  readonly data: Readonly<Record<string, unknown>>;
}

const cases: readonly Case[] = [
  {
    name: "derive, refuted",
    statement: stated("derive", { premises: order, conclusion }),
    answer: found("countermodel", chain, { searches: [searched({ noneUpTo: 2, foundAt: 3 })] }),
    summary: "fails: a countermodel on 3 points (checked); none on fewer (complete search)",
    data: { claim: "entails", countermodelSize: 3, noCountermodelUpTo: 2 },
  },
  {
    name: "conjecture, all sizes searched",
    statement: stated("conjecture", { claim: entails }),
    answer: claimAnswer({ searches: [searched()] }),
    summary: "open: no countermodel on 1 to 8 points; 12,345 of 200,000 steps",
    data: { claim: "entails", countermodelSize: null, noCountermodelUpTo: 8 },
  },
  {
    name: "conjecture, budget ended",
    statement: stated("conjecture", { claim: entails }, { within: 5000 }),
    answer: claimAnswer({ searches: [searched({ noneUpTo: 6, ended: "budget", endedAt: 7 })] }),
    summary: "open: no countermodel on 1 to 6 points; the budget of 5,000 steps ended at 7 points",
    data: { claim: "entails", countermodelSize: null, noCountermodelUpTo: 6 },
  },
  {
    name: "conjecture, symmetric structures looked at",
    statement: stated("conjecture", { claim: entails }),
    answer: claimAnswer({ searches: [searched({ symmetricUpTo: 13 })] }),
    summary:
      "open: no countermodel on 1 to 8 points; none met among symmetric ones up to 13; 12,345 of 200,000 steps",
    data: { claim: "entails", countermodelSize: null, noCountermodelUpTo: 8 },
  },
  {
    name: "derive, refuted beyond the sizes that were searched in full",
    statement: stated("derive", { premises: order, conclusion }),
    answer: found("countermodel", chain, { searches: [searched({ noneUpTo: 1, foundAt: 3 })] }),
    summary: "fails: a countermodel on 3 points (checked); none on 1 point (complete search)",
    data: { claim: "entails", countermodelSize: 3, noCountermodelUpTo: 1 },
  },
  {
    name: "conjecture, interrupted at once",
    statement: stated("conjecture", { claim: entails }),
    answer: claimAnswer({ searches: [searched({ noneUpTo: 0, ended: "interrupted", endedAt: 1 })] }),
    summary: "open: looking for a countermodel, interrupted at 1 point",
    data: { claim: "entails", countermodelSize: null, noCountermodelUpTo: 0 },
  },
  {
    name: "claim of truth",
    statement: stated("claim", {
      claim: {
        kind: "true-in",
        structure: { text: "Loop", structure: { carrier: { kind: "points", size: 1 }, relations: [] } },
        sentence: conclusion,
      },
    }),
    answer: found("structure", loop, { verdict: "holds" }),
    summary: "holds: evaluated in Loop, 1 point (checked)",
    data: { claim: "true-in" },
  },
  {
    name: "claim of consistency",
    statement: stated("claim", { claim: { kind: "consistent", theory: order } }),
    answer: found("model", loop, {
      verdict: "holds",
      searches: [searched({ sought: "a model", noneUpTo: 0, foundAt: 1 })],
    }),
    summary: "holds: a model on 1 point (checked)",
    data: { claim: "consistent", modelSize: 1, noModelUpTo: 0 },
  },
  {
    name: "claim of independence",
    statement: stated("claim", { claim: { kind: "independent", theory: order } }),
    answer: claimAnswer({ axioms }),
    summary: "open: 1 of 2 axioms independent; trans open",
    data: { claim: "independent", axioms: { irr: "independent", trans: "open" } },
  },
  {
    name: "claim of equivalence",
    statement: stated("claim", { claim: { kind: "equivalent", left: order, right: chains } }),
    answer: found("model of the first theory that is none of the second", chain),
    summary: "fails: a model of the first theory that is none of the second on 3 points (checked)",
    data: { claim: "equivalent", separatingSize: 3, noneUpTo: 0 },
  },
  {
    name: "check-finite, smallest model",
    statement: stated("check-finite", { theory: order }),
    answer: {
      question: "check-finite",
      verdict: "finite",
      steps: 9,
      evidence,
      leastSize: 4,
      modelSize: 4,
      noModelUpTo: 3,
      model: mixed,
      search: searched({ sought: "a model", noneUpTo: 3, foundAt: 4 }),
    },
    summary: "finite: a smallest model has 4 points (checked); none on 1 to 3 points (complete search)",
    data: { leastSize: 4, modelSize: 4, noModelUpTo: 3 },
  },
  {
    name: "check-finite, smaller sizes unsettled",
    statement: stated("check-finite", { theory: order }),
    answer: {
      question: "check-finite",
      verdict: "finite",
      steps: 9,
      evidence,
      leastSize: null,
      modelSize: 4,
      noModelUpTo: 1,
      model: mixed,
      search: searched({ sought: "a model", noneUpTo: 1, foundAt: 4 }),
    },
    summary:
      "finite: a model on 4 points (checked); none on 1 point (complete search); whether it is a smallest one is open",
    data: { leastSize: null, modelSize: 4, noModelUpTo: 1 },
  },
  {
    name: "check-finite, open",
    statement: stated("check-finite", { theory: order }),
    answer: {
      question: "check-finite",
      verdict: "open",
      steps: 200000,
      evidence: null,
      leastSize: null,
      modelSize: null,
      noModelUpTo: 6,
      model: null,
      search: searched({ sought: "a model", noneUpTo: 6, ended: "budget", endedAt: 7 }),
    },
    summary: "open: no model on 1 to 6 points; the budget of 200,000 steps ended at 7 points",
    data: { leastSize: null, modelSize: null, noModelUpTo: 6 },
  },
  {
    name: "models, all",
    statement: stated("models", { theory: order, size: 3 }),
    answer: {
      question: "models",
      verdict: null,
      steps: 7,
      evidence,
      size: 3,
      models: [chain, structureOf(3, [R, []])],
      complete: true,
      more: false,
      ended: null,
    },
    summary: "2 models on 3 points up to isomorphism, each checked; no others (complete search)",
    data: {
      size: 3,
      models: [{ R: [[1, 2], [1, 3], [2, 3]] }, { R: [] }], // biome-ignore format: a table
      complete: true,
    },
  },
  {
    name: "models, none found before the end",
    statement: stated("models", { theory: order, size: 9 }),
    answer: {
      question: "models",
      verdict: null,
      steps: 7,
      evidence: null,
      size: 9,
      models: [],
      complete: false,
      more: false,
      ended: "memory",
    },
    summary: "no model found on 9 points; the bound on memory was met",
    data: { size: 9, models: [], complete: false },
  },
  {
    name: "count, to the end",
    statement: stated("count", { theory: order, representatives: true }, { upTo: 2 }),
    answer: {
      question: "count",
      verdict: null,
      steps: 7,
      evidence,
      sizes: [
        { size: 1, labelled: 1n, unlabelled: 1n, representatives: [structureOf(1, [R, []])] },
        {
          size: 2,
          labelled: 3n,
          unlabelled: 2n,
          representatives: [structureOf(2, [R, []]), structureOf(2, [R, [[1, 2]]])],
        },
      ],
      ended: null,
      endedAt: null,
    },
    summary:
      "3 labelled models on 2 points, 2 up to isomorphism; 1 to 2 points counted (computed, not certified)",
    data: { labelled: { 1: 1, 2: 3 }, unlabelled: { 1: 1, 2: 2 } },
  },
  {
    name: "count, the budget ended and a number is huge",
    statement: stated("count", { theory: order, representatives: false }, { upTo: 9, within: 5000 }),
    answer: {
      question: "count",
      verdict: null,
      steps: 5000,
      evidence: null,
      // Not the numbers of any theory: only how they are shown matters here.
      sizes: [
        { size: 1, labelled: 2n, unlabelled: 2n, representatives: [] },
        { size: 2, labelled: 2n ** 64n, unlabelled: null, representatives: [] },
      ],
      ended: "budget",
      endedAt: 2,
    },
    summary:
      "18,446,744,073,709,551,616 labelled models on 2 points; 1 point counted; the budget of 5,000 steps ended at 2 points (computed, not certified)",
    data: { labelled: { 1: 2, 2: "18446744073709551616" }, unlabelled: { 1: 2 } },
  },
  {
    name: "count, nothing finished",
    statement: stated("count", { theory: order, representatives: false }, { upTo: 9, within: 1 }),
    answer: {
      question: "count",
      verdict: null,
      steps: 1,
      evidence: null,
      sizes: [],
      ended: "interrupted",
      endedAt: 1,
    },
    summary: "no size was counted; interrupted at 1 point",
    data: { labelled: {}, unlabelled: {} },
  },
  {
    name: "independence",
    statement: stated("independence", { theory: order }),
    answer: { question: "independence", verdict: null, steps: 3, evidence, axioms },
    summary: "1 of 2 axioms independent (checked); trans open",
    data: { axioms: { irr: "independent", trans: "open" } },
  },
  {
    name: "compare two",
    statement: stated("compare", { theories: [order, chains] }),
    answer: {
      question: "compare",
      verdict: "open",
      steps: 3,
      evidence,
      names: ["Order", "Chains - last"],
      pairs: [
        {
          left: 0,
          right: 1,
          verdict: "open",
          leftOnly: chain,
          rightOnly: null,
          jointlyInconsistent: false,
          common: loop,
        },
      ],
      classes: [["Order"], ["Chains - last"]],
      interrupted: false,
    },
    summary:
      "open: a model of Order on 3 points is none of Chains - last (checked); whether Chains - last entails Order is open",
    data: {
      pairs: [{ left: "Order", right: "Chains - last", verdict: "open", jointlyInconsistent: false }],
      classes: [["Order"], ["Chains - last"]],
    },
  },
  {
    name: "compare three, one direction derived",
    statement: stated("compare", { theories: [order, chains, order] }),
    answer: {
      question: "compare",
      verdict: null,
      steps: 3,
      evidence,
      names: ["A", "B", "C"],
      pairs: [
        {
          left: 0,
          right: 1,
          verdict: "incomparable",
          leftOnly: chain,
          rightOnly: loop,
          jointlyInconsistent: null,
          common: null,
        },
        {
          left: 0,
          right: 2,
          verdict: "at-least-as-strong",
          leftOnly: null,
          rightOnly: null,
          jointlyInconsistent: null,
          common: null,
        },
        {
          left: 1,
          right: 2,
          verdict: "open",
          leftOnly: null,
          rightOnly: null,
          jointlyInconsistent: null,
          common: null,
        },
      ],
      classes: [["A"], ["B"], ["C"]],
      interrupted: true,
    },
    summary: "3 pairs: 1 incomparable and 1 at-least-as-strong (checked); 1 open",
    data: {
      pairs: [
        { left: "A", right: "B", verdict: "incomparable", jointlyInconsistent: null },
        { left: "A", right: "C", verdict: "at-least-as-strong", jointlyInconsistent: null },
        { left: "B", right: "C", verdict: "open", jointlyInconsistent: null },
      ],
      classes: [["A"], ["B"], ["C"]],
    },
  },
  {
    name: "dualise",
    statement: stated("dualise", { theory: order }),
    answer: {
      question: "dualise",
      verdict: null,
      steps: 3,
      evidence,
      duals: [
        { name: "Order", theory: order.theory },
        { name: "converse(Order)", theory: chains.theory },
      ],
      pairs: [{ left: 0, right: 1, verdict: "different", witness: { structure: chain, modelOf: 1 } }],
      interrupted: false,
    },
    summary: "1 pair of 2 duals: 1 different (checked)",
    data: { pairs: [{ left: "Order", right: "converse(Order)", verdict: "different" }] },
  },
];

function caseNamed(name: string): Case {
  return cases.find((one) => one.name === name)!;
}

describe("answers", () => {
  it.each(cases)("$name", ({ statement, answer, summary, data }) => {
    const shown = showAnswer(statement, answer);
    expect(shown.summary).toBe(summary);
    expect(dataOf(statement, answer)).toEqual(data);
    checkBundle(shown.data);
    // The line may be broken, but nothing of it is lost.
    expect(shown.data["text/plain"]!.replace(/\s+/g, " ")).toContain(summary);
    expect(readMarkup(shown.data["text/html"]!).text.replace(/\s+/g, " ")).toContain(
      summary.replace(/^[a-z-]+: /, ""),
    );
    expect(showAnswer(statement, answer)).toEqual(shown);
  });

  it("gives a structure in plain text as a table of 0 and 1 and as text of a cell", () => {
    const { data } = showAnswer(caseNamed("derive, refuted").statement, caseNamed("derive, refuted").answer);
    const plain = data["text/plain"]!;
    expect(plain).toContain("points 3 where R is { (1,2), (1,3), (2,3) }");
    expect(plain).toContain("R 1 2 3\n───────\n1 0 1 1\n2 0 0 1\n3 0 0 0");
  });

  it("gives relations of one and three places as lists", () => {
    const plain = showAnswer(
      caseNamed("check-finite, smallest model").statement,
      caseNamed("check-finite, smallest model").answer,
    ).data["text/plain"]!;
    expect(plain).toContain("Between is { (1,2,3), (3,2,1) }");
    expect(plain.replace(/\s+/g, " ")).toContain("Deep is { (2), (4) }");
  });

  it("says when a question is asked without identity, and only then", () => {
    const without = showAnswer(
      caseNamed("conjecture, all sizes searched").statement,
      caseNamed("conjecture, all sizes searched").answer,
    ).data;
    expect(without["text/plain"]).toContain("without identity");
    expect(without["text/html"]).toContain("without identity");
    const withIdentity = stated("conjecture", { claim: { ...entails, premises: chains } });
    expect(
      showAnswer(withIdentity, caseNamed("conjecture, all sizes searched").answer).data["text/plain"],
    ).not.toContain("without identity");
  });

  it("says `checked` only where there is evidence", () => {
    for (const { statement, answer } of cases) {
      const shown = showAnswer(statement, { ...answer, evidence: null } as Answer);
      expect(shown.summary).not.toContain("checked");
      expect(shown.data["text/plain"]).not.toContain("checked");
    }
  });

  it("shows models in rows of pictures with their numbers, the rest folded, and all of them as text", () => {
    const models = Array.from(
      { length: 30 },
      (_, bits) =>
      structureOf(3, [R, [[1, 2], [2, 3], [3, 1], [1, 1], [2, 2]].filter((__, bit) => (bits >> bit) & 1)]), // biome-ignore format: a table
    );
    const { data } = showAnswer(caseNamed("models, all").statement, {
      ...caseNamed("models, all").answer,
      models,
    } as Answer);
    checkBundle(data);
    const { elements, text } = readMarkup(data["text/html"]!);
    expect(elements.filter(({ name }) => name === "img")).toHaveLength(30);
    expect(text).toContain("6 more pictures");
    expect(data["text/html"]!.match(/<small>an arrow from x to y/g)).toHaveLength(1);
    for (const form of ["text/plain", "text/html", "text/latex"] as const) {
      const listed = form === "text/html" ? text : data[form]!;
      expect(listed.match(/points 3 where R is/g)).toHaveLength(30);
    }
    expect(data["text/plain"]).not.toContain("an arrow");
  });

  it("lists no tuples of a huge relation", () => {
    const pairs = Array.from({ length: 900 }, (_, i) => [Math.floor(i / 30) + 1, (i % 30) + 1]);
    const huge = structureOf(30, [R, pairs]);
    const show = (models: Structure[]) =>
      showAnswer(caseNamed("models, all").statement, { ...caseNamed("models, all").answer, models } as Answer)
        .data;
    expect(show([huge])["text/plain"]).toContain("R: 900 tuples, not listed");
    const several = show([huge, huge, huge]);
    checkBundle(several);
    expect(several["text/plain"]).toContain("30 points; too many tuples to list");
    expect(several["text/html"]).not.toContain("<img");
  });

  it("says when a relation depends on differences alone", () => {
    const around = Array.from({ length: 7 }, (_, i) =>
      [1, 2, 4].map((d) => [i + 1, ((i + d) % 7) + 1]),
    ).flat();
    const { data } = showAnswer(
      caseNamed("derive, refuted").statement,
      found("countermodel", structureOf(7, [R, around])),
    );
    expect(data["text/plain"]).toContain("R holds of (x, y) exactly when y − x modulo 7 is one of 1, 2, 4");
    const other = showAnswer(
      caseNamed("derive, refuted").statement,
      found("countermodel", structureOf(7, [R, around.slice(1)])),
    );
    expect(other.data["text/plain"]).not.toContain("modulo");
  });
});

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
        expect(structureData(buildStructure(statement.definition.structure))).toEqual(
          structureData(structure),
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
        axioms: [{ label: name, verdict: "independent", witness: structure, search: searched() }],
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
