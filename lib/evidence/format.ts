/**
 * The format of evidence, version 1. It is JSON, stands in the notebook beside the verdict, and is all that the
 * checker reads.
 *
 * | key         | value                                                                                            |
 * | ---         | ---                                                                                              |
 * | `format`    | `"twoplace-evidence"`                                                                            |
 * | `version`   | `1`                                                                                              |
 * | `sentences` | the closed formulas that the question is about, each once; elsewhere they go by their index here |
 * | `question`  | what was asked, expanded: no name of a definition is left in it                                  |
 * | `digest`    | SHA-256, in hexadecimal, of the JSON text of `[sentences, question]`                             |
 * | `verdict`   | the verdict that the facts below support                                                         |
 * | `facts`     | what was established, each with the structure that shows it                                      |
 *
 * A formula is a nested list: `["is", "R", "x", "y"]`, `["=", "x", "y"]`, `["true"]`, `["false"]`, `["not", φ]`,
 * `["and", φ, ψ, …]`, `["or", φ, ψ, …]`, `["implies", φ, ψ]`, `["iff", φ, ψ]`, `["forall", "x", φ]`,
 * `["exists", "x", φ]`.
 *
 * A structure is `{carrier, tables}`; `tables` gives for each relation its number of places and the kinds of tuples
 * at which it holds, in ascending order. On the carrier `{"kind": "points", "size": n}` the kind of a tuple of
 * points p₁ … p_k, counted from 1, is the number (p₁ − 1)·n^(k−1) + … + (p_k − 1).
 */
import type { CarrierDescription } from "../logic/structure-definition.ts";

export const EVIDENCE_FORMAT = "twoplace-evidence";
export const EVIDENCE_VERSION = 1;

export type FormulaRecord = readonly [string, ...(string | FormulaRecord)[]];

export interface TableRecord {
  readonly places: number;
  readonly holds: readonly number[];
}
export interface StructureRecord {
  readonly carrier: CarrierDescription;
  /** By the name of the relation, names in ascending order. */
  readonly tables: Readonly<Record<string, TableRecord>>;
}

/** The number of a sentence in `sentences`. */
export type SentenceIndex = number;
/** A theory: the numbers of its axioms. */
export type TheoryRecord = readonly SentenceIndex[];

/** What was asked. `claim` and `conjecture` ask the same; so do `derive` and the claim `T ⊨ φ`. */
export type QuestionRecord =
  | {
      readonly ask: "entails" | "does-not-entail";
      readonly premises: TheoryRecord;
      readonly conclusion: SentenceIndex;
    }
  | {
      readonly ask: "true-in" | "false-in";
      readonly structure: StructureRecord;
      readonly sentence: SentenceIndex;
    }
  | { readonly ask: TheoryQuestion; readonly axioms: TheoryRecord }
  | { readonly ask: "weaker" | "equivalent"; readonly left: TheoryRecord; readonly right: TheoryRecord }
  | { readonly ask: "compare" | "dualise"; readonly theories: readonly TheoryRecord[] };

/** Questions about one theory. `models` asks for models of a size, and each fact is one. */
export const THEORY_QUESTIONS = [
  "consistent",
  "infinite-only",
  "no-finite-model",
  "independent",
  "check-finite",
  "independence",
  "models",
] as const;
export type TheoryQuestion = (typeof THEORY_QUESTIONS)[number];

/** What one structure shows: all of `holds` are true in it, and of `fails`, where given, at least one is false. */
export interface StructureFact {
  readonly fact: "structure";
  readonly structure: StructureRecord;
  readonly holds: TheoryRecord;
  /** Null when nothing is said to fail. */
  readonly fails: TheoryRecord | null;
}
export type Fact = StructureFact;

/**
 * The verdict that the facts support: one word; for `independence`, `compare` and `dualise` one word for each axiom
 * or pair, pairs in the order (0,1), (0,2), …, (1,2), …; null where a question has no verdict.
 */
export type VerdictRecord = string | readonly string[] | null;

export interface Evidence {
  readonly format: typeof EVIDENCE_FORMAT;
  readonly version: typeof EVIDENCE_VERSION;
  readonly sentences: readonly FormulaRecord[];
  readonly question: QuestionRecord;
  readonly digest: string;
  readonly verdict: VerdictRecord;
  readonly facts: readonly Fact[];
}
