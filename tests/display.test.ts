import { beforeAll, describe, expect, it } from "vitest";
import { showAnswer } from "../kernel/display/answers.ts";
import { dataOf } from "../kernel/display/data.ts";
import { prepareDrawing } from "../kernel/display/drawing.ts";
import { drawStrength } from "../kernel/display/strength.ts";
import type { Structure } from "../lib/carriers/structure.ts";
import type { Answer, AxiomAnswer, CompareAnswer } from "../lib/inquiry/answer.ts";
import type { Statement } from "../lib/language/statements.ts";
import { checkBundle } from "./support/bundles.ts";
import {
  chain,
  chains,
  claimAnswer,
  conclusion,
  entails,
  evidence,
  found,
  loop,
  mixed,
  order,
  R,
  reported,
  searched,
  stated,
  structureOf,
} from "./support/display-fixtures.ts";
import { readMarkup } from "./support/markup.ts";

beforeAll(prepareDrawing);

const axioms: readonly AxiomAnswer[] = [
  {
    label: "irr",
    verdict: "independent",
    witness: loop,
    derivation: null,
    search: searched({ noneUpTo: 0, foundAt: 1 }),
    report: reported(),
  },
  {
    label: "trans",
    verdict: "open",
    witness: null,
    derivation: null,
    search: searched({ noneUpTo: 5, ended: "budget", endedAt: 6 }),
    report: reported({ result: "ended", ended: "budget", generated: 1234 }),
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
      provenUpTo: 3,
      model: mixed,
      noFinite: null,
      search: searched({ sought: "a model", noneUpTo: 3, foundAt: 4 }),
      derivation: null,
      report: reported(),
    },
    summary:
      "finite: a smallest model has 4 points (checked); none on 1 to 3 points (clause proofs, checked)",
    data: { leastSize: 4, modelSize: 4, noModelUpTo: 3, provenUpTo: 3 },
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
      provenUpTo: 0,
      model: mixed,
      noFinite: null,
      search: searched({ sought: "a model", noneUpTo: 1, foundAt: 4 }),
      derivation: null,
      report: reported(),
    },
    summary:
      "finite: a model on 4 points (checked); none on 1 point (complete search); whether it is a smallest one is open",
    data: { leastSize: null, modelSize: 4, noModelUpTo: 1, provenUpTo: 0 },
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
      provenUpTo: 0,
      model: null,
      noFinite: null,
      search: searched({ sought: "a model", noneUpTo: 6, ended: "budget", endedAt: 7 }),
      derivation: null,
      report: reported({ sought: "a contradiction", result: "ended", ended: "budget", generated: 5678 }),
    },
    summary:
      "open: no derivation among 5,678 clauses; no model on 1 to 6 points; the budget of 200,000 steps ended at 7 points",
    data: { leastSize: null, modelSize: null, noModelUpTo: 6, provenUpTo: 0 },
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
      provenNone: false,
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
      provenNone: false,
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
          leftEntailsRight: false,
          rightEntailsLeft: false,
          derivations: [],
        },
      ],
      classes: [["Order"], ["Chains - last"]],
      inconsistent: [],
      interrupted: false,
    },
    summary:
      "open: a model of Order on 3 points is none of Chains - last (checked); whether Chains - last entails Order is open",
    data: {
      pairs: [{ left: "Order", right: "Chains - last", verdict: "open", jointlyInconsistent: false }],
      classes: [["Order"], ["Chains - last"]],
      inconsistent: [],
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
          leftEntailsRight: false,
          rightEntailsLeft: false,
          derivations: [],
        },
        {
          left: 0,
          right: 2,
          verdict: "at-least-as-strong",
          leftOnly: null,
          rightOnly: null,
          jointlyInconsistent: null,
          common: null,
          leftEntailsRight: true,
          rightEntailsLeft: false,
          derivations: [],
        },
        {
          left: 1,
          right: 2,
          verdict: "open",
          leftOnly: null,
          rightOnly: null,
          jointlyInconsistent: null,
          common: null,
          leftEntailsRight: false,
          rightEntailsLeft: false,
          derivations: [],
        },
      ],
      classes: [["A"], ["B"], ["C"]],
      inconsistent: [],
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
      inconsistent: [],
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
      pairs: [
        {
          left: 0,
          right: 1,
          verdict: "different",
          witness: { structure: chain, modelOf: 1 },
          derivations: [],
        },
      ],
      interrupted: false,
    },
    summary: "1 pair of 2 duals: 1 different (checked)",
    data: { pairs: [{ left: "Order", right: "converse(Order)", verdict: "different" }] },
  },
];

function caseNamed(name: string): Case {
  return cases.find((one) => one.name === name)!;
}

describe("the order of strength", () => {
  const three = caseNamed("compare three, one direction derived").answer as CompareAnswer;

  it("is drawn with stronger theories higher, where something is known to entail something", () => {
    const picture = drawStrength(three)!;
    expect(picture.alt).toBe("Drawing of 3 theories: A entails C.");
    expect(picture.caption).toContain("may be open");
    const height = (name: string) => Number(new RegExp(`y="([\\d.]+)"[^>]*>${name}<`).exec(picture.svg)![1]);
    expect(height("A")).toBeLessThan(height("C"));
  });

  it("is closed under what follows, and has equivalent theories at one point", () => {
    const pair = (left: number, right: number, leftEntailsRight: boolean, rightEntailsLeft: boolean) => ({
      ...three.pairs[2]!,
      ...{ left, right, leftEntailsRight, rightEntailsLeft },
    });
    const pairs = [pair(0, 1, true, true), pair(1, 2, true, false), pair(2, 3, true, false)];
    const names = ["A", "B", "C", "D"];
    const picture = drawStrength({ ...three, names, classes: [["A", "B"], ["C"], ["D"]], pairs })!;
    expect(picture.alt).toBe("Drawing of 3 theories: A = B entails C and C entails D.");
    expect(picture.svg).toContain("= B");
  });

  it("is left out where there is nothing to draw", () => {
    const none = three.pairs.map((one) => ({ ...one, leftEntailsRight: false, rightEntailsLeft: false }));
    expect(drawStrength({ ...three, pairs: none })).toBeNull();
    expect(drawStrength({ ...three, names: ["A", "B"], classes: [["A"], ["B"]] })).toBeNull();
  });
});

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
