/** Derivations to read: what stands in the lines, that it is what the evidence says, and how it is set. */
import { describe, expect, it } from "vitest";
import type { Block, Inline, TableBlock } from "../kernel/display/blocks.ts";
import { renderBundle } from "../kernel/display/bundle.ts";
import { type Reading, readDerivation } from "../kernel/display/derivation-reading.ts";
import { showDerivation, showDerivations } from "../kernel/display/derivations.ts";
import { blocksToText } from "../kernel/display/to-text.ts";
import { DerivationSearch } from "../lib/derivation/turns.ts";
import { checkEvidence } from "../lib/evidence/check.ts";
import type { LineRecord } from "../lib/evidence/format.ts";
import type { ShownDerivation } from "../lib/inquiry/answer.ts";
import { EvidenceWriter } from "../lib/inquiry/evidence-writer.ts";
import { emptyScope } from "../lib/language/statements.ts";
import { variablesOf } from "../lib/logic/formula.ts";
import { Meter } from "../lib/logic/meter.ts";
import { Solver } from "../lib/structures/sat/solver.ts";
import { checkBundle } from "./support/bundles.ts";
import { questions, readSentences } from "./support/corpora.ts";
import {
  asymmetry,
  cases,
  derivationOf,
  evidenceOf,
  exchange,
  reflexivity,
} from "./support/derivation-examples.ts";
import { readMarkup } from "./support/markup.ts";

/** R(a, b) and R(b, a), one from the other, so often. */
function longDerivation(steps: number): ShownDerivation {
  const lines: LineRecord[] = [
    ["clause", 0, 0],
    ["clause", 1, 0],
    ["clause", 1, 1],
  ];
  for (let step = 0; step < steps; step += 1) {
    const [from, to] = step % 2 === 0 ? ["1.0", "1.1"] : ["1.1", "1.0"];
    lines.push([
      "infer",
      [["is", "R", [to!], [from!]]],
      [
        [0, { x: [from!], y: [to!] }],
        [step === 0 ? 1 : lines.length - 1, {}],
      ],
    ]);
  }
  lines.push([
    "infer",
    [],
    [
      [2, {}],
      [lines.length - 1, {}],
    ],
  ]);
  return derivationOf({ sym: "∀x ∀y (Rxy → Ryx)" }, "∀x ∀y (Rxy → Ryx)", { made: [], lines });
}

const examples: readonly (readonly [string, ShownDerivation])[] = [
  ["of asymmetry", asymmetry],
  ["of reflexivity, with a function", reflexivity],
  ["with an exchange of equals", exchange],
  ["with a relation made on the way", cases],
  ["of many lines", longDerivation(21)],
];

const textOf = (shown: ShownDerivation) => blocksToText(showDerivation(shown));

/** The sentence and the reason of each line. */
function rowsOf(shown: ShownDerivation): readonly string[] {
  const table = tableIn(showDerivation(shown));
  return table.rows.map((row) => row.slice(1).map(inlineText).join(" | "));
}

function tableIn(blocks: readonly Block[]): TableBlock {
  const found = blocks.flatMap((block) =>
    block.kind === "table" ? [block] : block.kind === "fold" ? [tableIn(block.blocks)] : [],
  );
  return found[0]!;
}

function inlineText(parts: readonly Inline[]): string {
  return blocksToText([{ kind: "line", parts }]).replace(/\n/g, " ");
}

function citedLines({ lines }: Reading): readonly (readonly [number, readonly number[]])[] {
  return lines.map(({ reason }, index) => {
    const cited =
      reason.kind === "inference"
        ? [...reason.cited, ...reason.since].map(({ line }) => line)
        : [...("from" in reason ? [reason.from] : []), ...("by" in reason ? [reason.by] : [])];
    return [index + 1, cited];
  });
}

describe.each(examples)("a derivation %s", (_, shown) => {
  it("is one that the checker accepts", () => {
    expect(checkEvidence(evidenceOf(shown))).toMatchObject({ accepted: true });
  });

  it("mentions earlier lines alone, and all but the last are mentioned", () => {
    const reading = readDerivation(shown);
    const mentioned = new Set<number>();
    for (const [number, cited] of citedLines(reading))
      for (const line of cited) {
        expect(line).toBeGreaterThanOrEqual(1);
        expect(line).toBeLessThan(number);
        mentioned.add(line);
      }
    expect(mentioned.size).toBe(reading.lines.length - 1);
    expect(reading.lines.at(-1)!.sentence).toBeNull();
  });

  it("is set in text, HTML and LaTeX, the same each time", () => {
    const bundle = renderBundle(showDerivation(shown), "with-latex");
    checkBundle(bundle);
    expect(renderBundle(showDerivation(shown), "with-latex")).toEqual(bundle);
    expect(bundle["text/latex"]).toMatch(/\\begin\{(tabular|longtable)\}\{@\{\}rp/);
  });
});

describe("wording", () => {
  it("puts what is given first, then names, then what follows", () => {
    expect(textOf(asymmetry)).toBe(
      `Derivation: the conclusion follows
line  sentence                    because
────────────────────────────────────────────────────────────────────────
1     ∀x ¬Rxx                     axiom irr
2     ∀x ∀y ∀z (Rxy ∧ Ryz → Rxz)  axiom trans
3     ¬∀x ∀y (Rxy → ¬Ryx)         suppose not: the conclusion is false
4     Rab ∧ Rba                   from 3; let a and b be such x and y
5     Raa                         from 4, and 2 with x = a, y = b, z = a
6     contradiction               from 5, and 1 with x = a
7     ∀x ∀y (Rxy → ¬Ryx)          so 3 is false and the conclusion holds
(Uses irr and trans.)`,
    );
  });

  it("names functions, says what they stand for, and joins facts with the rule that they meet", () => {
    expect(rowsOf(reflexivity).slice(4)).toEqual([
      "R(x, f(x)) | from 1; for each x let f(x) be such a y",
      "¬Raa | from 4; let a be such an x",
      "R(f(x), x) | from 5, and 2 with y = f(x)",
      "Rxx | from 5 and 7, and 3 with y = f(x), z = x",
      "contradiction | from 6, and 8 with x = a",
      "∀x Rxx | so 4 is false and the conclusion holds",
    ]);
    expect(textOf(reflexivity)).toContain("Variables without a quantifier stand for all elements.");
  });

  it("draws the laws of identity into the lines that use them", () => {
    expect(rowsOf(exchange).slice(3, 6)).toEqual([
      "b = c | from 3, and 1 with x = a, y = b, z = c",
      "Rcd | from 3, since b = c (line 4)",
      "contradiction | from 3 and 5",
    ]);
  });

  it("says what a relation that was made on the way is short for", () => {
    const rows = rowsOf(cases);
    expect(rows).toContain("D ↔ ∀x Rxx | D is short for the right-hand side");
    expect(rows).toContain("Raa → D | from 4; let a be such an x");
    expect(rows.at(-1)).toMatch(/^contradiction \| from /);
    expect(textOf(cases)).toMatch(/^Derivation: the axioms contradict each other\n/);
  });

  it("takes names that are not in use", () => {
    const scope = { ...emptyScope, declared: [{ name: "b", places: 1, infix: false }] };
    const shown = derivationOf(
      { some: "∃c b(c)", none: "∀a ¬b(a)" },
      null,
      {
        made: [],
        lines: [
          ["clause", 0, 0],
          ["clause", 1, 0],
          [
            "infer",
            [],
            [
              [0, {}],
              [1, { a: ["0.0"] }],
            ],
          ],
        ],
      },
      scope,
    );
    expect(rowsOf(shown).slice(2)).toEqual([
      "bd | from 1; let d be such a c",
      "contradiction | from 3, and 2 with a = d",
    ]);
  });

  it("prints clauses as implications", () => {
    const shown = derivationOf({ all: "∀x ∀y ∀z ∀u (Rxy ∧ Rzu → x = z) ∧ ∃x ∃y Rxy" }, null, {
      made: [],
      lines: [
        ["clause", 0, 0],
        ["clause", 0, 1],
        ["infer", [["not", ["is", "R", "z", "u"]], ["=", ["0.0"], "z"]], [[0, { x: ["0.0"], y: ["0.1"] }], [1, {}]]],
        ["infer", [["not", ["is", "R", "x", "y"]], ["not", ["=", "x", "y"]]], [[2, {}]]],
        ["infer", [["not", ["is", "R", "x", "y"]], ["not", ["is", "R", "y", "x"]]], [[3, {}], [2, {}]]],
        ["infer", [["is", "R", "x", "y"], ["=", "x", "y"]], [[4, {}], [3, {}]]],
        ["infer", [], [[5, {}], [2, {}]]],
      ],
    }); // biome-ignore format: a line each
    // The lines do not follow from each other: only how they are printed is looked at.
    const sentences = rowsOf(shown).map((row) => row.split(" | ")[0]);
    expect(sentences).toEqual(
      expect.arrayContaining(["Rzu → a = z", "Rxy → x ≠ y", "¬(Rxy ∧ Ryx)", "Rxy ∨ x = y"]),
    );
  });

  it("says that quantifiers were moved inside where that changes what depends on what", () => {
    const shown = derivationOf({ far: "∀x ∃y (Rxx → Ryy)", on: "∀x Rxx", off: "∀x ¬Rxx" }, null, {
      made: [["miniscope", 0]],
      lines: [
        ["clause", 3, 0],
        ["clause", 1, 0],
        ["clause", 2, 0],
        ["infer", [["is", "R", ["3.0"], ["3.0"]]], [[0, {}], [1, {}]]],
        ["infer", [], [[3, {}], [2, { x: ["3.0"] }]]],
      ],
    }); // biome-ignore format: a line each
    expect(checkEvidence(evidenceOf(shown))).toMatchObject({ accepted: true });
    expect(rowsOf(shown).slice(3, 5)).toEqual([
      "∃y Ryy ∨ ∀x ¬Rxx | from 1, quantifiers moved inside",
      "Rxx → Raa | from 4; let a be such a y",
    ]);
  });
});

describe("relations that are written out, or put in", () => {
  it("names the relation, and the line that says what it means", () => {
    const shown = derivationOf(
      { meet: "∀x ∀y (Rxy ↔ ∃z (Szx ∧ Szy))", some: "∃x ∃y Rxy", none: "∀x ∀y ¬Sxy" },
      null,
      {
        made: [["unfold", 1, 0]],
        lines: [
          ["clause", 3, 0],
          ["clause", 2, 0],
          ["infer", [], [[0, {}], [1, { x: ["3.2"], y: ["3.0"] }]]],
        ],
      },
      { ...emptyScope, declared: ["R", "S"].map((name) => ({ name, places: 2, infix: false })) },
    ); // biome-ignore format: a line each
    expect(checkEvidence(evidenceOf(shown))).toMatchObject({ accepted: true });
    expect(rowsOf(shown).slice(3)).toEqual([
      "∃x ∃y ∃z (Szx ∧ Szy) | from 2, with R written out as in 1",
      "Sba | from 4; let a and b be such x and z",
      "contradiction | from 5, and 3 with x = b, y = a",
    ]);
  });

  it("says where a relation made on the way has been put in, and the conclusion's negation without ¬¬", () => {
    const shown = derivationOf({ both: "∃x (Rxx ∧ ∀y Rxy)" }, "¬∀x ¬∀y Rxy", {
      made: [
        ["define", "every", ["v1"], ["forall", "y", ["is", "R", "v1", "y"]]],
        ["fold", 0, 2, ["exists", "x", ["and", ["is", "R", "x", "x"], ["is", "every", "x"]]]],
        ["fold", 1, 2, ["not", ["not", ["forall", "x", ["not", ["is", "every", "x"]]]]]],
      ],
      lines: [
        ["clause", 3, 1],
        ["clause", 4, 0],
        ["infer", [], [[0, {}], [1, { x: ["3.0"] }]]],
      ],
    }); // biome-ignore format: a line each
    expect(checkEvidence(evidenceOf(shown))).toMatchObject({ accepted: true });
    expect(rowsOf(shown)).toEqual([
      "∃x (Rxx ∧ ∀y Rxy) | axiom both",
      "∀x ¬∀y Rxy | suppose not: the conclusion is false",
      "∀z (Dz ↔ ∀y Rzy) | D is short for the right-hand side",
      "∃x (Rxx ∧ Dx) | from 1, with D put in as in 3",
      "Da | from 4; let a be such an x",
      "∀x ¬Dx | from 2, with D put in as in 3",
      "contradiction | from 5, and 6 with x = a",
      "¬∀x ¬∀y Rxy | so 2 is false and the conclusion holds",
    ]);
  });
});

describe("steps that cite much", () => {
  it("are taken apart, and each part follows", () => {
    const shown = derivationOf(
      {
        trans: "∀x ∀y ∀z (Rxy ∧ Ryz → Rxz)",
        chain: "∃x ∃y ∃z ∃u ∃v (Rxy ∧ Ryz ∧ Rzu ∧ Ruv ∧ ¬Rxv)",
      },
      null,
      {
        made: [],
        lines: [
          ["clause", 0, 0],
          ["clause", 1, 0],
          ["clause", 1, 1],
          ["clause", 1, 2],
          ["clause", 1, 3],
          ["clause", 1, 4],
          [
            "infer",
            [],
            [
              [0, { x: ["1.0"], y: ["1.1"], z: ["1.2"] }],
              [0, { x: ["1.0"], y: ["1.2"], z: ["1.3"] }],
              [0, { x: ["1.0"], y: ["1.3"], z: ["1.4"] }],
              [1, {}],
              [2, {}],
              [3, {}],
              [4, {}],
              [5, {}],
            ],
          ],
        ],
      },
    );
    expect(checkEvidence(evidenceOf(shown))).toMatchObject({ accepted: true });
    const rows = rowsOf(shown);
    expect(rows.slice(2, 4)).toEqual([
      "Rab ∧ Rbc ∧ Rcd ∧ Rde | from 2; let a, b, c, d and e be such x, y, z, u and v",
      "¬Rae | from 2",
    ]);
    expect(rows.slice(4)).toEqual([
      "Rac | from 3, and 1 with x = a, y = b, z = c",
      "Rad | from 3 and 5, and 1 with x = a, y = c, z = d",
      "contradiction | from 3, 4 and 6, and 1 with x = a, y = d, z = e",
    ]);
  });
});

/** Derivations that the search finds, of questions with short ones. */
function foundDerivations(count: number): readonly ShownDerivation[] {
  const found: ShownDerivation[] = [];
  for (const { id, premises, conclusion, expected } of questions) {
    if (expected !== "holds" || found.length === count) continue;
    const sentences = readSentences([...premises, conclusion]);
    const task = { premises: sentences.slice(0, -1), conclusion: sentences.at(-1)! };
    const search = new DerivationSearch(task, (onDerived) => new Solver({ observer: { onDerived } }));
    const meter = new Meter(3000);
    while (search.generated < 1000 && !search.done) search.next(meter);
    if (!search.done) continue;
    const outcome = search.next(meter);
    if (outcome.result !== "derived") throw new Error(`${id}: ${outcome.result}`);
    const { derivation } = outcome;
    found.push({
      role: id,
      premises: derivation.premises.map((place) => ({
        label: `a${place + 1}`,
        formula: task.premises[place]!,
      })),
      conclusion: derivation.usesConclusion ? task.conclusion : null,
      fact: new EvidenceWriter().addDerivation(task, derivation),
    });
  }
  return found;
}

describe("derivations that the search has found", () => {
  const found = foundDerivations(60);

  it("mention earlier lines alone, and use every line", () => {
    expect(found).toHaveLength(60);
    for (const shown of found) {
      const reading = readDerivation(shown);
      const mentioned = new Set<number>();
      for (const [number, cited] of citedLines(reading))
        for (const line of cited) {
          expect(line, shown.role).toBeLessThan(number);
          mentioned.add(line);
        }
      expect(mentioned.size, shown.role).toBe(reading.lines.length - 1);
    }
  });

  it("have one name for one thing: no constant is a variable of the user's", () => {
    for (const shown of found) {
      const given = shown.premises.map(({ formula }) => formula).concat(shown.conclusion ?? []);
      const variables = new Set(given.flatMap((formula) => [...variablesOf(formula)]));
      const names = readDerivation(shown).lines.flatMap(({ introduced }) =>
        introduced.map(({ term }) => (typeof term === "string" ? term : term.symbol.name)),
      );
      expect(new Set(names).size).toBe(names.length);
      for (const name of names) expect(variables.has(name), `${shown.role}: ${name}`).toBe(false);
    }
  });

  it("are set in every form", () => {
    for (const shown of found) checkBundle(renderBundle(showDerivation(shown), "with-latex"));
  });
});

describe("length", () => {
  it("folds each of several", () => {
    const blocks = showDerivations([asymmetry, exchange]);
    expect(blocks).toMatchObject([
      { kind: "fold", title: "Derivation, 7 lines, from irr and trans: the conclusion follows" },
      { kind: "fold", title: "Derivation, 7 lines, from unique: the conclusion follows" },
    ]);
    expect(showDerivations([asymmetry])).toEqual(showDerivation(asymmetry));
    expect(showDerivations([])).toEqual([]);
  });

  it("leaves a short one open", () => {
    expect(showDerivation(asymmetry).map(({ kind }) => kind)).toEqual(["table", "note"]);
  });

  it("folds a long one, with its length and its axioms in the title; text has all of it", () => {
    const [fold, ...rest] = showDerivation(longDerivation(21));
    expect(rest).toEqual([]);
    expect(fold).toMatchObject({
      kind: "fold",
      title: "Derivation, 26 lines, from sym: the conclusion follows",
    });
    const html = renderBundle([fold!], "without-latex")["text/html"]!;
    expect(readMarkup(html).elements.some(({ name }) => name === "details")).toBe(true);
    expect(textOf(longDerivation(21)).split("\n")).toHaveLength(31);
  });
});

it("shows labels as text, whatever is in them", () => {
  const hostile = {
    ...asymmetry,
    role: "<script>alert(1)</script>",
    premises: asymmetry.premises.map((premise) => ({ ...premise, label: '<img src="x">&' })),
  };
  const bundle = renderBundle(showDerivation(hostile), "with-latex");
  checkBundle(bundle);
  expect(readMarkup(bundle["text/html"]!).text).toContain("<script>alert(1)</script>");
});
