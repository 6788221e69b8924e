/** Derivations written by hand, as the search could have found them; the checker accepts each. */

import { digestOf } from "../../lib/evidence/digest.ts";
import { type DerivationFact, EVIDENCE_FORMAT, EVIDENCE_VERSION } from "../../lib/evidence/format.ts";
import type { ShownDerivation } from "../../lib/inquiry/answer.ts";
import { parseFormula } from "../../lib/language/parser.ts";
import { emptyScope, type Scope } from "../../lib/language/statements.ts";
import type { Formula } from "../../lib/logic/formula.ts";
import { recordFormula } from "../../lib/logic/records/formulas.ts";

/** A sentence of cell text. */
export function sentence(text: string, scope: Scope = emptyScope): Formula {
  const parsed = parseFormula(text, scope);
  if ("diagnostics" in parsed) throw new Error(`${text}: ${parsed.diagnostics[0]?.message}`);
  return parsed.formula;
}

/** A derivation from labelled premises of a conclusion, or of a contradiction. */
export function derivationOf(
  premises: Readonly<Record<string, string>>,
  conclusion: string | null,
  record: Pick<DerivationFact, "made" | "lines">,
  scope: Scope = emptyScope,
): ShownDerivation {
  const axioms = Object.entries(premises).map(([label, text]) => ({ label, formula: sentence(text, scope) }));
  return {
    role: conclusion === null ? "the axioms contradict each other" : "the conclusion follows",
    premises: axioms,
    conclusion: conclusion === null ? null : sentence(conclusion, scope),
    fact: {
      fact: "derivation",
      premises: axioms.map((_, index) => index),
      conclusion: conclusion === null ? null : axioms.length,
      ...record,
    },
  };
}

/** The evidence that consists of a derivation. */
export function evidenceOf({ premises, conclusion, fact }: ShownDerivation) {
  const formulas = [...premises.map(({ formula }) => formula), ...(conclusion === null ? [] : [conclusion])];
  const sentences = formulas.map(recordFormula);
  const question =
    conclusion === null
      ? ({ ask: "consistent", axioms: fact.premises } as const)
      : ({ ask: "entails", premises: fact.premises, conclusion: premises.length } as const);
  return {
    format: EVIDENCE_FORMAT,
    version: EVIDENCE_VERSION,
    sentences,
    question,
    digest: digestOf(sentences, question),
    verdict: conclusion === null ? "fails" : "holds",
    facts: [fact],
  };
}

const trans = "∀x ∀y ∀z (Rxy ∧ Ryz → Rxz)";

/** Resolutions one at a time, and no variable left at the end. */
export const asymmetry = derivationOf({ irr: "∀x ¬Rxx", trans }, "∀x ∀y (Rxy → ¬Ryx)", {
  made: [],
  lines: [
    ["clause", 0, 0],
    ["clause", 1, 0],
    ["clause", 2, 0],
    ["clause", 2, 1],
    ["infer", [["not", ["is", "R", ["2.1"], "z"]], ["is", "R", ["2.0"], "z"]], [[1, { x: ["2.0"], y: ["2.1"] }], [2, {}]]],
    ["infer", [["is", "R", ["2.0"], ["2.0"]]], [[4, { z: ["2.0"] }], [3, {}]]],
    ["infer", [], [[0, { x: ["2.0"] }], [5, {}]]],
  ],
}); // biome-ignore format: a line each

/** A function, and clauses with variables on the way. */
export const reflexivity = derivationOf(
  { serial: "∀x ∃y Rxy", sym: "∀x ∀y (Rxy → Ryx)", trans },
  "∀x Rxx",
  {
    made: [],
    lines: [
      ["clause", 0, 0],
      ["clause", 1, 0],
      ["clause", 2, 0],
      ["clause", 3, 0],
      ["infer", [["is", "R", ["0.0", "x"], "x"]], [[1, { y: ["0.0", "x"] }], [0, {}]]],
      [
        "infer",
        [["not", ["is", "R", ["0.0", "x"], "z"]], ["is", "R", "x", "z"]],
        [[2, { y: ["0.0", "x"] }], [0, {}]],
      ],
      ["infer", [["is", "R", "x", "x"]], [[5, { z: "x" }], [4, {}]]],
      ["infer", [], [[6, { x: ["3.0"] }], [3, {}]]],
    ],
  },
); // biome-ignore format: a line each

/** Equal elements exchanged by a law of identity. */
export const exchange = derivationOf(
  { unique: "∀x ∀y ∀z (Rxy ∧ Rxz → y = z)" },
  "∀x ∀y ∀z ∀u (Rxy ∧ Rxz ∧ Ryu → Rzu)",
  {
    made: [],
    lines: [
      ["clause", 0, 0],
      ["clause", 1, 0],
      ["clause", 1, 1],
      ["clause", 1, 2],
      ["clause", 1, 3],
      [
        "identity",
        [
          ["not", ["=", ["1.1"], ["1.2"]]],
          ["not", ["is", "R", ["1.1"], ["1.3"]]],
          ["is", "R", ["1.2"], ["1.3"]],
        ],
      ],
      ["infer", [["=", ["1.1"], ["1.2"]]], [[0, { x: ["1.0"], y: ["1.1"], z: ["1.2"] }], [1, {}], [2, {}]]],
      ["infer", [["is", "R", ["1.2"], ["1.3"]]], [[3, {}], [6, {}], [5, {}]]],
      ["infer", [], [[7, {}], [4, {}]]],
    ],
  },
); // biome-ignore format: a line each

/** Two cases, under a name that the search has made for one of them; the premises contradict each other. */
export const cases = derivationOf(
  {
    either: "∀x Rxx ∨ ∀x ∀y Rxy",
    not: "∀x ∀y (Rxy → ¬Ryx)",
  },
  null,
  {
    made: [["define", "case-1", [], ["forall", "x", ["is", "R", "x", "x"]]]],
    lines: [
      ["clause", 0, 0],
      ["clause", 1, 0],
      ["clause", 2, 0],
      ["clause", 2, 1],
      ["infer", [["not", ["is", "R", "x", "x"]]], [[1, { y: "x" }]]],
      ["infer", [["not", ["is", "case-1"]]], [[2, {}], [4, {}]]],
      ["infer", [["not", ["is", "R", ["2.0"], ["2.0"]]]], [[3, {}], [5, {}]]],
      ["infer", [["is", "R", "x", "x"], ["is", "R", "x'", "y"]], [[0, {}]]],
      ["infer", [["is", "R", "x'", "y"]], [[7, { x: ["2.0"] }], [6, {}]]],
      ["infer", [], [[8, { "x'": "x", y: "x" }], [4, {}]]],
    ],
  },
); // biome-ignore format: a line each
