/** Collecting the evidence of one question while it is worked on. */
import { type AnyStructure, isOfTerms } from "../carriers/any-structure.ts";
import { recordStructure } from "../carriers/structure-record.ts";
import type { Derivation, DerivationTask } from "../derivation/derive.ts";
import { digestOf } from "../evidence/digest.ts";
import {
  type DerivationFact,
  EVIDENCE_FORMAT,
  EVIDENCE_VERSION,
  type Evidence,
  type Fact,
  type FormulaRecord,
  type NoModelFact,
  type PrincipleRecord,
  type QuestionRecord,
  type TheoryRecord,
  type VerdictRecord,
} from "../evidence/format.ts";
import type { Formula } from "../logic/formula.ts";
import { recordFormula } from "../logic/records/formulas.ts";

/** Collects the sentences and facts of one question's evidence. */
export class EvidenceWriter {
  readonly #sentences: FormulaRecord[] = [];
  readonly #numbers = new Map<string, number>();
  readonly #facts: Fact[] = [];

  /** Whether there are no facts yet. */
  get isEmpty(): boolean {
    return this.#facts.length === 0;
  }

  /** The sentences so far. */
  get sentences(): readonly FormulaRecord[] {
    return this.#sentences;
  }

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

  /**
   * Adds what a structure shows: all of `holds` true, and at least one of `fails` false unless it is null. One of free
   * terms was found for these sentences, the negated conjunction of `fails` last.
   */
  addStructure(structure: AnyStructure, holds: readonly Formula[], fails: readonly Formula[] | null): void {
    const says = { holds: this.theory(holds), fails: fails === null ? null : this.theory(fails) };
    if (isOfTerms(structure)) this.#facts.push({ fact: "terms", ...structure, ...says });
    else this.#facts.push({ fact: "structure", structure: recordStructure(structure), ...says });
  }

  /** Adds a derivation of a task, with the premises that it uses. */
  addDerivation(task: DerivationTask, derivation: Derivation): DerivationFact {
    const fact: DerivationFact = {
      fact: "derivation",
      premises: this.theory(derivation.premises.map((place) => task.premises[place]!)),
      conclusion:
        task.conclusion !== null && derivation.usesConclusion ? this.sentence(task.conclusion) : null,
      ...derivation.record,
    };
    this.#facts.push(fact);
    return fact;
  }

  /** Adds that the sentences have no model of a size. */
  addNoModel(sentences: readonly Formula[], size: number, proof: NoModelFact["proof"]): void {
    this.#facts.push({ fact: "no-model", axioms: this.theory(sentences), size, proof });
  }

  /** Adds that the sentences have no finite model; what the principle asks for is derived in facts of their own. */
  addNoFiniteModel(sentences: readonly Formula[], principle: PrincipleRecord): void {
    this.#facts.push({ fact: "no-finite-model", axioms: this.theory(sentences), principle });
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
