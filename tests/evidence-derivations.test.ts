/** Derivations written by hand: each rule at work, and near misses of every condition that makes it sound. */
import { describe, expect, it } from "vitest";
import { checkEvidence } from "../lib/evidence/check.ts";
import {
  type DerivationFact,
  EVIDENCE_FORMAT,
  EVIDENCE_VERSION,
  type Evidence,
  type FormulaRecord,
  type LineRecord,
  type MadeFormula,
} from "../lib/evidence/format.ts";
import { digestOf } from "../lib/evidence/record.ts";

const irreflexive: FormulaRecord = ["forall", "x", ["not", ["is", "R", "x", "x"]]];
const transitive: FormulaRecord = [
  "forall",
  "x",
  [
    "forall",
    "y",
    [
      "forall",
      "z",
      ["implies", ["and", ["is", "R", "x", "y"], ["is", "R", "y", "z"]], ["is", "R", "x", "z"]],
    ],
  ],
];
const asymmetric: FormulaRecord = [
  "forall",
  "x",
  ["forall", "y", ["implies", ["is", "R", "x", "y"], ["not", ["is", "R", "y", "x"]]]],
];

/** Evidence that the last sentence follows from the others by one derivation. */
function evidenceOf(
  sentences: readonly FormulaRecord[],
  lines: readonly LineRecord[],
  made: readonly MadeFormula[] = [],
  change: Partial<DerivationFact> = {},
): Evidence {
  const premises = [...sentences.keys()].slice(0, -1);
  const question = { ask: "entails", premises, conclusion: premises.length } as const;
  return {
    format: EVIDENCE_FORMAT,
    version: EVIDENCE_VERSION,
    sentences,
    question,
    digest: digestOf(sentences, question),
    verdict: "holds",
    facts: [{ fact: "derivation", premises, conclusion: premises.length, made, lines, ...change }],
  };
}

function reasonFor(evidence: Evidence): string {
  const result = checkEvidence(JSON.parse(JSON.stringify(evidence)));
  return result.accepted ? "" : result.reason;
}

describe("derivations that are accepted", () => {
  it("clauses and an inference: a strict order is asymmetric", () => {
    const lines: LineRecord[] = [
      ["clause", 0, 0],
      ["clause", 1, 0],
      ["clause", 2, 0],
      ["clause", 2, 1],
      [
        "infer",
        [
          ["not", ["is", "R", "x", "y"]],
          ["not", ["is", "R", "y", "x"]],
        ],
        [
          [0, {}],
          [1, { z: "x" }],
        ],
      ],
      [
        "infer",
        [],
        [
          [4, { x: ["2.0"], y: ["2.1"] }],
          [2, {}],
          [3, {}],
        ],
      ],
    ];
    expect(reasonFor(evidenceOf([irreflexive, transitive, asymmetric], lines))).toBe("");
  });
});
