/** Why there is no finite model, as people read it: every principle and its variants, in every form. */
import { beforeAll, describe, expect, it } from "vitest";
import { showAnswer } from "../kernel/display/answers.ts";
import type { Inline } from "../kernel/display/blocks.ts";
import { dataOf } from "../kernel/display/data.ts";
import { prepareDrawing } from "../kernel/display/drawing.ts";
import { reasonBlocks, reasonData, reasonParagraph } from "../kernel/display/reasons.ts";
import { inlineToHtml } from "../kernel/display/to-html.ts";
import { inlineToLatex } from "../kernel/display/to-latex.ts";
import { inlineToMarkdown } from "../kernel/display/to-markdown.ts";
import { blocksToText, inlineToText } from "../kernel/display/to-text.ts";
import type { FiniteAnswer, ShownReason } from "../lib/inquiry/answer.ts";
import { CARRIERS } from "../lib/inquiry/carrier-list.ts";
import { printFormula } from "../lib/language/printer.ts";
import type { Theory } from "../lib/logic/theory.ts";
import { checkBundle } from "./support/bundles.ts";
import {
  claimAnswer,
  evidence,
  found,
  irr,
  loop,
  reported,
  searched,
  serial,
  stated,
  theoryOf,
  trans,
} from "./support/display-fixtures.ts";
import { definedStructure } from "./support/infinite-fixtures.ts";
import { reasonNamed, reasonParts } from "./support/reason-fixtures.ts";

beforeAll(prepareDrawing);

const names = Object.keys(reasonParts);

/** A theory whose axioms are what a reason asks for. */
function theoryFor({ obligations }: ShownReason): Theory {
  return theoryOf(Object.fromEntries(obligations.map(({ formula }, index) => [`a${index + 1}`, formula])));
}

function paragraphOf(name: string): readonly Inline[] {
  const shown = reasonNamed(name);
  return reasonParagraph(shown, theoryFor(shown).axioms);
}

describe("the paragraph", () => {
  it.each([
    [
      "an endless order",
      "Let φ(x, y) be Rxy ∧ ¬Ryx. By the axioms …, φ is irreflexive and transitive, and every element x has some y with φ(x, y). Pass from any element to such a y, from there to another, and so on. In a finite domain some element a would be met twice, and then φ(a, a) by transitivity, against irreflexivity. So every model is infinite.",
    ],
    [
      "an endless order by an infix relation",
      "By the axioms …, < is irreflexive and transitive, and every element x has some y with x < y. Pass from any element to such a y, from there to another, and so on. In a finite domain some element a would be met twice, and then a < a by transitivity, against irreflexivity. So every model is infinite.",
    ],
    [
      "an endless order above an element",
      "Let k be an element with ∃x Rkx; by the axioms there is one. Let D be the set of all elements x with Rkx. Let φ(x, y) be Rxy ∧ ¬Ryx. By the axioms …, D is not empty, φ is irreflexive and transitive on D, and every element x of D has some y in D with φ(x, y). Pass from any element of D to such a y, from there to another, and so on. If D were finite, some element a would be met twice, and then φ(a, a) by transitivity, against irreflexivity. So every model is infinite.",
    ],
    [
      "a map that is one to one and not onto",
      "Call y a successor of x, and x a predecessor of y, when Rxy. By the axioms …, every element has a successor, no element has two predecessors, and some element has no predecessor. Choose a successor for each element. No two elements have the same one, and some element is chosen for none: this is a one-to-one map of the domain into itself that is not onto, and a finite set has no such map. So every model is infinite.",
    ],
    [
      "a map that is one to one everywhere",
      "Let D be the set of all elements x with ¬Rxx. Call y a successor of x, and x a predecessor of y, when Rxy. By the axioms …, every element of D has a successor in D, no element has two predecessors, and some element of D has no predecessor in D. Choose a successor in D for each element of D. No two elements have the same one, and some element is chosen for none: this is a one-to-one map of D into itself that is not onto, and a finite set has no such map. So every model is infinite.",
    ],
    [
      "three successors on a part",
      "Let D be the set of all elements x with ¬Rxx. Call y a successor of x, and x a predecessor of y, when Rxy and both are in D. By the axioms …, D is not empty, every element of D has at least three successors, and every element of D has at most two predecessors. If D had just n elements, counting the pairs of an element and a successor of it by their first elements would give at least 3n, and by their second elements at most 2n, which is impossible. So every model is infinite.",
    ],
    [
      "without identity",
      "Let φ(x, y) be Rxy ∧ ¬Ryx. Call y a successor of x, and x a predecessor of y, when φ(x, y). By the axioms …, every element has a successor, no element has two predecessors, and some element has no predecessor. Identity does not occur in the axioms, so elements x and y are different here when R tells them apart: when for some element z it holds of just one of (x, z) and (y, z), or of just one of (z, x) and (z, y). Elements that are not told apart count as one in what follows; φ holds alike of them. Choose a successor for each element. No two elements have the same one, and some element is chosen for none: this is a one-to-one map of the domain into itself that is not onto, and a finite set has no such map. So every model is infinite.",
    ],
    [
      "unordered pairs with two elements",
      "Let u and v be elements with u ≠ v; by the axioms there are such. Let D be the set of all elements x with ¬Rxu. Let φ(x, y, z) be Rxz ∧ (Ryz ∨ x = y). By the axioms …, for all x and y in D there is some z in D with φ(x, y, z), every z is so related to at most two pairs of x and y, and there are at least three elements in D. If D had just n elements, there would be n² pairs, of which the n elements serve at most 2n. So n ≤ 2, although there are at least three elements. So every model is infinite.",
    ],
    [
      "comprehension on a part",
      "Let D be the set of all elements x with ¬Rxx. Let φ(x, y) be Ryx. Call x a member of y when φ(x, y) and both are in D. By the axioms …, some element of D has no members, and for all x and y in D there is an element of D whose members are those of x and y itself. If D were finite, every set of elements of D would be the set of members of some element, by adding one member after the other. Let the members of z be just those elements of D that are not members of themselves: then z is a member of itself if and only if it is not. So every model is infinite.",
    ],
  ])("of %s", (name, text) => {
    // How many sentences a condition is split into does not matter here.
    expect(inlineToText(paragraphOf(name)).replace(/(a\d+, )*a\d+ and a\d+/, "…")).toBe(text);
  });

  it.each(names)("of %s says δ, φ and what there must be, and stands in every form", (name) => {
    const { reason } = reasonNamed(name);
    const parts = paragraphOf(name);
    const text = inlineToText(parts);
    for (const formula of [reason.relation, reason.domain, reason.given])
      if (formula !== null && formula.kind !== "true")
        expect(text).toContain(printFormula(formula, "unicode"));
    expect(text).toMatch(/[A-Zx<].* So every model is infinite\.$/);
    expect(text).not.toMatch(/undefined|null| {2}|\.\.| ,|\( /);
    for (const form of [inlineToLatex(parts), inlineToMarkdown(parts)]) {
      expect(form.split("$").length % 2).toBe(1);
      // Nothing that is mathematics stands outside of it.
      expect(form.replace(/\$[^$]*\$/g, "")).not.toMatch(/[∀∃¬∧∨→↔≠≤²φψ\\]/);
    }
    expect(
      inlineToHtml(parts)
        .replace(/<[^>]*>/g, "")
        .replace(/&lt;/g, "<"),
    ).toBe(text);
  });

  it("says numbers as the principle has them", () => {
    const bounds = (name: string) =>
      /at least (\S+?n?(?: \+ 1)?), and by their second elements at most (\S+?n?(?: − 1)?),/
        .exec(inlineToText(paragraphOf(name)))
        ?.slice(1);
    expect(bounds("two successors")).toEqual(["2n", "n"]);
    expect(bounds("three successors on a part")).toEqual(["3n", "2n"]);
    expect(bounds("two and two, one with fewer")).toEqual(["2n", "2n − 1"]);
    expect(bounds("two and two, one with more")).toEqual(["2n + 1", "2n"]);
    expect(bounds("a map that is onto and not one to one")).toEqual(["n + 1", "n"]);
  });
});

describe("what the reason takes from the axioms", () => {
  it("is listed below, each sentence with its role and where it comes from", () => {
    for (const name of names) {
      const shown = reasonNamed(name);
      const text = blocksToText(reasonBlocks(shown, theoryFor(shown).axioms)).replace(/\s+/g, " ");
      expect(text).toContain(`${shown.obligations.length} sentences, all of them axioms`);
      for (const [index] of shown.obligations.entries()) expect(text).toContain(`axiom a${index + 1}`);
    }
  });

  it("is data for programs", () => {
    const data = (name: string) => reasonData(reasonNamed(name).reason);
    expect(data("an endless order")).toEqual({
      principle: "endless-order",
      domain: "true",
      relation: "R(x,y) & ~R(y,x)",
    });
    expect(data("unordered pairs with two elements")).toEqual({
      principle: "pairs",
      pairs: 2,
      domain: "~R(x,u)",
      relation: "R(x,z) & (R(y,z) | x = y)",
      parameters: ["u", "v"],
      given: "u != v",
    });
    expect(data("two and two, one with more")).toMatchObject({
      successors: 2,
      predecessors: 2,
      spare: "more-successors",
    });
  });
});

describe("questions about finite models", () => {
  const theory = { text: "Dense", theory: theoryOf({ irr, trans, up: serial }) };
  const noFinite: ShownReason = {
    ...reasonNamed("an endless order"),
    obligations: [
      { role: "it is irreflexive", formula: irr, derivation: null },
      { role: "it is transitive", formula: trans, derivation: null },
      { role: "every element has a successor", formula: serial, derivation: null },
    ],
  };
  const rationals = definedStructure("dense-line where Rxy iff x < y");
  const answer = (rest: Partial<FiniteAnswer>): FiniteAnswer => ({
    question: "check-finite",
    verdict: "open",
    steps: 4321,
    evidence,
    leastSize: null,
    modelSize: null,
    noModelUpTo: 5,
    provenUpTo: 0,
    model: null,
    noFinite: null,
    search: searched({ sought: "a model", noneUpTo: 5, noneOnCarriers: 12, ended: "budget", endedAt: 6 }),
    derivation: null,
    report: reported({ sought: "a contradiction", result: "ended", ended: "budget", generated: 99 }),
    ...rest,
  });
  const reason = { principle: "endless-order", domain: "true", relation: "R(x,y) & ~R(y,x)" };
  const infiniteModel = "dense-line where R(x,y) iff x < y";
  const none = `12 of ${CARRIERS.length} infinite carriers`;

  it.each([
    [
      "infinite-only",
      answer({ verdict: "infinite-only", model: rationals, noFinite }),
      "infinite-only: a model on the rational line; no finite one, by irr, trans and up (checked)",
      { infiniteModel, reason },
    ],
    [
      "no-finite-model",
      answer({ verdict: "no-finite-model", noFinite }),
      `no-finite-model: no finite model, by irr, trans and up (checked); whether there is an infinite one is open: no derivation among 99 clauses; no model on ${none}; the budget of 200,000 steps ended`,
      { reason },
    ],
    [
      "consistent",
      answer({ verdict: "consistent", model: rationals }),
      "consistent: a model on the rational line (checked); whether there is a finite one is open: no model on 1 to 5 points; the budget of 200,000 steps ended at 6 points",
      { infiniteModel },
    ],
    [
      "open",
      answer({ evidence: null }),
      `open: no derivation among 99 clauses; no model on 1 to 5 points; none on ${none}; the budget of 200,000 steps ended at 6 points`,
      {},
    ],
  ] as const)("come out %s", (_, shown, summary, data) => {
    const statement = stated("check-finite", { theory });
    const display = showAnswer(statement, shown);
    expect(display.summary).toBe(summary);
    expect(dataOf(statement, shown)).toEqual({
      leastSize: null,
      modelSize: null,
      noModelUpTo: 5,
      provenUpTo: 0,
      ...data,
    });
    checkBundle(display.data);
    const plain = display.data["text/plain"]!;
    expect(plain.includes("No finite model. Let φ(x, y) be")).toBe(shown.noFinite !== null);
    expect(plain.includes("dense-line where Rxy iff x < y")).toBe(shown.model !== null);
    // Without evidence nothing is said to be checked.
    const bare = showAnswer(statement, { ...shown, evidence: null });
    expect(bare.data["text/plain"]).not.toContain("checked");
  });

  const structures = [{ role: "infinite model", structure: rationals }];
  const search = searched({ sought: "a model", noneUpTo: 5, noneOnCarriers: 3 });

  it.each([
    [
      "infinite-only",
      claimAnswer({ verdict: "holds", evidence, structures, noFinite, searches: [search] }),
      "holds: an infinite model on the rational line; no finite one, by irr, trans and up (checked)",
      { modelSize: null, noModelUpTo: 5, infiniteModel, reason },
    ],
    [
      "infinite-only",
      found("model", loop, { searches: [searched({ foundAt: 1, noneUpTo: 0 })] }),
      "fails: a model on 1 point (checked)",
      { modelSize: 1, noModelUpTo: 0 },
    ],
    [
      "infinite-only",
      claimAnswer({ structures, searches: [search] }),
      `open: an infinite model on the rational line; no model on 1 to 5 points; none on 3 of ${CARRIERS.length} infinite carriers; 12,345 of 200,000 steps`,
      { modelSize: null, noModelUpTo: 5, infiniteModel },
    ],
    [
      "infinite-only",
      claimAnswer({ noFinite, searches: [search] }),
      `open: no finite model, by irr, trans and up; no model on 1 to 5 points; none on 3 of ${CARRIERS.length} infinite carriers; 12,345 of 200,000 steps`,
      { modelSize: null, noModelUpTo: 5, reason },
    ],
    [
      "no-finite-model",
      claimAnswer({ verdict: "holds", evidence, noFinite, searches: [search] }),
      "holds: no finite model, by irr, trans and up (checked)",
      { modelSize: null, noModelUpTo: 5, reason },
    ],
    [
      "consistent",
      claimAnswer({
        verdict: "holds",
        evidence,
        structures: [{ role: "model", structure: rationals }],
        searches: [search],
      }),
      "holds: a model on the rational line (checked); none on 1 to 5 points (complete search)",
      { modelSize: null, noModelUpTo: 5, infiniteModel },
    ],
  ] as const)("as claims: %s %#", (kind, shown, summary, data) => {
    const statement = stated("claim", { claim: { kind, theory } });
    const display = showAnswer(statement, shown);
    expect(display.summary).toBe(summary);
    expect(dataOf(statement, shown)).toEqual({ claim: kind, ...data });
    checkBundle(display.data);
  });
});
