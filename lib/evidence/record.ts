/** Writing evidence: formulas and structures as records, and the digest of a question. */
import { sha256 } from "@noble/hashes/sha2.js";
import { bytesToHex, utf8ToBytes } from "@noble/hashes/utils.js";
import type { Structure } from "../carriers/structure.ts";
import type { Formula } from "../logic/formula.ts";
import {
  EVIDENCE_FORMAT,
  EVIDENCE_VERSION,
  type Evidence,
  type Fact,
  type FormulaRecord,
  type QuestionRecord,
  type StructureRecord,
  type TableRecord,
  type TheoryRecord,
  type VerdictRecord,
} from "./format.ts";

export function recordFormula(formula: Formula): FormulaRecord {
  switch (formula.kind) {
    case "true":
    case "false":
      return [formula.kind];
    case "atom":
      return ["is", formula.relation.name, ...formula.args];
    case "equal":
      return ["=", formula.left, formula.right];
    case "not":
      return ["not", recordFormula(formula.body)];
    case "and":
    case "or":
      return [formula.kind, ...formula.parts.map(recordFormula)];
    case "implies":
    case "iff":
      return [formula.kind, recordFormula(formula.left), recordFormula(formula.right)];
    case "forall":
    case "exists":
      return [formula.kind, formula.variable, recordFormula(formula.body)];
  }
}

export function recordStructure(structure: Structure): StructureRecord {
  const tables: Record<string, TableRecord> = {};
  for (const name of [...structure.tables.keys()].sort()) {
    const { relation, holds } = structure.tables.get(name)!;
    const kinds: number[] = [];
    holds.forEach((value, kind) => {
      if (value === 1) kinds.push(kind);
    });
    tables[name] = { places: relation.places, holds: kinds };
  }
  return { carrier: structure.carrier.description, tables };
}

/** The digest by which stored evidence is known to belong to a question. */
export function digestOf(sentences: readonly FormulaRecord[], question: QuestionRecord): string {
  return bytesToHex(sha256(utf8ToBytes(JSON.stringify([sentences, question]))));
}

/** Collects the sentences and facts of one question's evidence. */
export class EvidenceWriter {
  readonly #sentences: FormulaRecord[] = [];
  readonly #numbers = new Map<string, number>();
  readonly #facts: Fact[] = [];

  /** The number of a sentence, the same for the same sentence. */
  sentence(formula: Formula): number {
    const record = recordFormula(formula);
    const text = JSON.stringify(record);
    let number = this.#numbers.get(text);
    if (number === undefined) {
      number = this.#sentences.push(record) - 1;
      this.#numbers.set(text, number);
    }
    return number;
  }

  /** The numbers of a theory's axioms, in order. */
  theory(sentences: readonly Formula[]): TheoryRecord {
    return sentences.map((sentence) => this.sentence(sentence));
  }

  /** Adds what a structure shows: all of `holds` true, and at least one of `fails` false unless it is null. */
  addStructure(structure: Structure, holds: readonly Formula[], fails: readonly Formula[] | null): void {
    this.#facts.push({
      fact: "structure",
      structure: recordStructure(structure),
      holds: this.theory(holds),
      fails: fails === null ? null : this.theory(fails),
    });
  }

  /** The evidence for a verdict. Number the question's own sentences first, by building its record first. */
  finish(question: QuestionRecord, verdict: VerdictRecord): Evidence {
    return {
      format: EVIDENCE_FORMAT,
      version: EVIDENCE_VERSION,
      sentences: this.#sentences,
      question,
      digest: digestOf(this.#sentences, question),
      verdict,
      facts: this.#facts,
    };
  }
}
