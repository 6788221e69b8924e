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
 * | `digest`    | SHA-256, in hexadecimal, of the JSON text of the question with its sentences written out         |
 * | `verdict`   | the verdict that the facts below support                                                         |
 * | `facts`     | what was established, each with the structure or the derivation that shows it                    |
 *
 * Formulas are as in `lib/logic/records/formulas.ts`, structures as in `lib/carriers/structure-record.ts` and
 * `lib/carriers/free-terms.ts`, principles as in `lib/logic/records/finiteness.ts`.
 */

import type { CertificateRecord, TermsRecord } from "../carriers/free-terms.ts";
import type { StructureRecord } from "../carriers/structure-record.ts";
import type { PrincipleRecord } from "../logic/records/finiteness.ts";
import type {
  ClauseRecord,
  FormulaRecord,
  TermFormulaRecord,
  TermRecord,
} from "../logic/records/formulas.ts";

export type * from "../carriers/free-terms.ts";
export type * from "../carriers/structure-record.ts";
export type * from "../logic/records/finiteness.ts";
export type * from "../logic/records/formulas.ts";

export const EVIDENCE_FORMAT = "twoplace-evidence";
export const EVIDENCE_VERSION = 1;

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

/**
 * Questions about one theory. `models` asks for models of a size; each structure among the facts is one. `minimise` asks
 * which sets of its axioms say as much as all of them and no smaller set within does.
 */
export const THEORY_QUESTIONS = [
  "consistent",
  "infinite-only",
  "no-finite-model",
  "independent",
  "check-finite",
  "independence",
  "models",
  "minimise",
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

/**
 * What a structure of free terms shows, in the same words. For each sentence of `holds`, in order, there is a certificate;
 * and where some of `fails` are said to be false, one more, of the negation of their conjunction.
 */
export interface TermsFact {
  readonly fact: "terms";
  readonly terms: TermsRecord;
  readonly holds: TheoryRecord;
  readonly fails: TheoryRecord | null;
  readonly certificates: readonly CertificateRecord[];
}

/**
 * A refutation: from all of `premises` and the negation of `conclusion`, or from the premises alone where that is
 * null, the last line derives the clause without literals.
 *
 * Its formulas are numbered: the premises in order, then the negated conclusion if there is one, then `made`.
 */
export interface DerivationFact {
  readonly fact: "derivation";
  readonly premises: TheoryRecord;
  readonly conclusion: SentenceIndex | null;
  readonly made: readonly MadeFormula[];
  readonly lines: readonly LineRecord[];
}

/**
 * A formula made of earlier ones, which go by number:
 * - `["define", "d", ["x", …], φ]` is ∀x … (d(x, …) ↔ φ) for a relation d that occurs in no formula before. The
 *   variables x, … are distinct and all that is free in φ; functions in φ belong to formulas before;
 * - `["unfold", i, j]` is formula i with the body of j in place of the relation that j, ∀x … (d(x, …) ↔ φ), is about;
 * - `["fold", i, j, φ]` is φ, of which formula i is the unfolding by j, up to names of bound variables;
 * - `["miniscope", i]` is formula i in negation normal form, its quantifiers as far inside as they go.
 */
export type MadeFormula =
  | readonly ["define", string, readonly string[], TermFormulaRecord]
  | readonly ["unfold", number, number]
  | readonly ["fold", number, number, TermFormulaRecord]
  | readonly ["miniscope", number];

/**
 * - `["clause", i, k]`: clause k of the clause form of formula i. Its functions are called `"i.0"`, `"i.1"`, …;
 * - `["identity", C]`: C is true by the laws of identity alone: after each s ≠ t in it, in order, has made t of every
 *   s in the other literals, one of them is u = u, or two are opposite;
 * - `["infer", C, [[line, {"x": t, …}], …]]`: with terms in place of variables, the lines named have C as a consequence
 *   by unit propagation: assume that no literal of C is true, and let each line of which all literals but one are
 *   false make that one true, until all literals of one line are false.
 */
export type LineRecord =
  | readonly ["clause", number, number]
  | readonly ["identity", ClauseRecord]
  | readonly ["infer", ClauseRecord, readonly UseRecord[]];
/** An earlier line, and what stands in it for its variables; one that is not mentioned stays. */
export type UseRecord = readonly [number, Readonly<Record<string, TermRecord>>];

/**
 * There is no model of `axioms` on `size` points. The proof is a list of clauses in the variables of the propositional
 * form that `lib/logic/ground-form.ts` defines, as in DIMACS; each follows by unit propagation from that form and
 * the clauses before it, and so at last does the empty clause.
 */
export interface NoModelFact {
  readonly fact: "no-model";
  readonly axioms: TheoryRecord;
  readonly size: number;
  readonly proof: readonly (readonly number[])[];
}

/**
 * `axioms` have no finite model, by a principle about finite sets. What it asks for, as `lib/logic/records/finiteness.ts`
 * makes it, is each one of the axioms or has a derivation from some of them among the facts.
 */
export interface NoFiniteModelFact {
  readonly fact: "no-finite-model";
  readonly axioms: TheoryRecord;
  readonly principle: PrincipleRecord;
}
export type Fact = StructureFact | TermsFact | DerivationFact | NoModelFact | NoFiniteModelFact;

/**
 * The verdict that the facts support: one word; for `independence`, `compare` and `dualise` one word for each axiom
 * or pair, pairs in the order (0,1), (0,2), …, (1,2), …; for `minimise` one for each set that was found, the places of
 * its axioms in ascending order, `"0,2,3"`, and before them `"complete"` where the facts show that there are no more;
 * null where a question has no verdict.
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
