/** Telling theories apart: a model of one that is none of the other, kept for the next pair. */
import type { Structure } from "../carriers/structure.ts";
import { type Formula, not } from "../logic/formula.ts";
import { Meter, WorkEnded } from "../logic/meter.ts";
import { conjunctionOf, type Signature, sentencesOf, type Theory } from "../logic/theory.ts";
import { satisfiesAll } from "../structures/evaluate.ts";
import type { EvidenceWriter } from "./evidence-writer.ts";
import { searchFinite } from "./finite-search.ts";
import type { Work } from "./work.ts";

/** Finds structures for many pairs of theories over one signature, and tries those it has before it searches. */
export class Separator {
  readonly #signature: Signature;
  readonly #writer: EvidenceWriter;
  readonly #work: Work;
  readonly #known: Structure[] = [];
  /** Steps spent so far. */
  steps = 0;
  /** Whether the user has interrupted; nothing more is searched then. */
  interrupted = false;

  constructor(signature: Signature, writer: EvidenceWriter, work: Work) {
    this.#signature = signature;
    this.#writer = writer;
    this.#work = work;
  }

  /** A model of the first theory that is none of the second, recorded in the evidence; null when none is found. */
  separate(model: Theory, other: Theory, budget: number): Structure | null {
    const wanted = [...sentencesOf(model), not(conjunctionOf(other))];
    const structure = this.#find("a model of one theory that is none of the other", wanted, budget);
    if (structure !== null) this.#writer.addStructure(structure, sentencesOf(model), sentencesOf(other));
    return structure;
  }

  /** A model of both theories, recorded in the evidence; null when none is found. */
  common(first: Theory, second: Theory, budget: number): Structure | null {
    const wanted = [...sentencesOf(first), ...sentencesOf(second)];
    const structure = this.#find("a common model", wanted, budget);
    if (structure !== null) this.#writer.addStructure(structure, wanted, null);
    return structure;
  }

  #find(sought: string, wanted: readonly Formula[], budget: number): Structure | null {
    if (this.interrupted) return null;
    const meter = new Meter(budget, this.#work.isInterrupted);
    try {
      const known = this.#known.find((structure) => satisfiesAll(structure, wanted, meter));
      if (known !== undefined) return known;
      const task = { sought, alternatives: [wanted], signature: this.#signature };
      const { structure } = searchFinite(task, meter, this.#work);
      if (structure !== null) this.#known.push(structure);
      return structure;
    } catch (problem) {
      if (problem instanceof WorkEnded) return null;
      throw problem;
    } finally {
      this.steps += meter.steps;
      if (meter.ended === "interrupted") this.interrupted = true;
    }
  }
}
