/** Which named properties a theory has models with, and models without: what `describe` says besides the text. */

import { Points } from "../carriers/points.ts";
import type { Structure } from "../carriers/structure.ts";
import type { Derivation, DerivationTask } from "../derivation/derive.ts";
import { DerivationSearch } from "../derivation/turns.ts";
import type { Evidence } from "../evidence/format.ts";
import { type Formula, not, type RelationSymbol } from "../logic/formula.ts";
import { type FiniteCheck, finiteCheckBound } from "../logic/fragments.ts";
import { type Meter, WorkEnded } from "../logic/meter.ts";
import { namedProperties, propertyOf } from "../logic/properties.ts";
import { type Signature, sentencesOf, type Theory } from "../logic/theory.ts";
import { satisfies } from "../structures/evaluate.ts";
import { Solver } from "../structures/sat/solver.ts";
import { enumerateStructures } from "../structures/search.ts";
import { certify } from "./certify.ts";
import { EvidenceWriter } from "./evidence-writer.ts";
import { jointSignature, searchFinite } from "./finite-search.ts";
import { InfiniteSearch } from "./infinite-search.ts";
import { meterFor, type Work } from "./work.ts";

/** What a search for models of one kind came to. */
export type ModelSearch =
  /** A model was found, on so many points, or an infinite one where that is null; there may be smaller ones. */
  | { readonly kind: "found"; readonly size: number | null }
  /** It is derived that there is none. */
  | { readonly kind: "derived" }
  /**
   * There is none on 1, …, this many points; 0 when not even one point was finished. Where a published bound says
   * that larger ones need not be looked at, there is none at all, and `decided` has the bound.
   */
  | { readonly kind: "none"; readonly upTo: number; readonly decided: FiniteCheck | null };

/** Models of a theory with a property, and models of it without. */
export interface PropertyFinding {
  /** The property as the cell language writes it of its relation: `transitive(R)`. */
  readonly name: string;
  readonly having: ModelSearch;
  readonly lacking: ModelSearch;
}

export interface Findings {
  /** In the order of the table of properties, relation by relation. */
  readonly properties: readonly PropertyFinding[];
  readonly steps: number;
  /** Accepted by the checker; null when no model was found. */
  readonly evidence: Evidence | null;
  /** Whether the budget ended, or the user interrupted, before all properties were looked at. */
  readonly endedEarly: boolean;
  readonly interrupted: boolean;
}

/** Sizes on which some models are listed once and tried on every property. */
const LISTED_SIZES = 3;
/** Models that are listed of each of those sizes. */
const LISTED_MODELS = 60;
/** Infinite models are looked for to the end of this round, within so many steps. */
const INFINITE_ROUND = 1;
const INFINITE_STEPS = 500;
/** A derivation of a property is given up when so many clauses have been generated. */
const DERIVATION_CLAUSES = 100;

/**
 * Looks for models with and without each named property of each two-place relation of the theory. Models that are
 * known are tried before any search. Sizes go to `work.upTo`, or to the published bound where that is smaller.
 */
export function examineProperties(theory: Theory, work: Work): Findings {
  const { relations } = jointSignature([theory]);
  const meter = meterFor(work);
  const examiner = new Examiner(theory, meter, work);
  const properties: PropertyFinding[] = [];
  let endedEarly = false;
  try {
    examiner.listModels();
    for (const relation of relations.filter(({ places }) => places === 2))
      for (const property of namedProperties) {
        const sentence = propertyOf(property, relation);
        const name = `${property.name}(${relation.name})`;
        properties.push({ name, having: examiner.find(sentence), lacking: examiner.find(not(sentence)) });
      }
  } catch (problem) {
    if (!(problem instanceof WorkEnded)) throw problem;
    endedEarly = true;
  }
  const interrupted = meter.ended === "interrupted";
  return { properties, steps: meter.steps, evidence: examiner.evidence(), endedEarly, interrupted };
}

class Examiner {
  readonly #sentences: readonly Formula[];
  readonly #relations: readonly RelationSymbol[];
  readonly #theory: Theory;
  readonly #meter: Meter;
  readonly #work: Work;
  /** Models of the theory, each with the sentences that it was found or tried to satisfy besides. */
  readonly #models: { readonly structure: Structure; readonly shows: Formula[] }[] = [];

  readonly #derived: { readonly task: DerivationTask; readonly derivation: Derivation }[] = [];

  constructor(theory: Theory, meter: Meter, work: Work) {
    this.#theory = theory;
    this.#sentences = sentencesOf(theory);
    this.#relations = jointSignature([theory]).relations;
    this.#meter = meter;
    this.#work = work;
  }

  /** Lists small models, or finds an infinite one where there are none, for every property to be tried on. */
  listModels(): void {
    for (let size = 1; size <= LISTED_SIZES; size += 1) {
      const task = { carrier: new Points(size), sentences: this.#sentences, relations: this.#relations };
      let listed = 0;
      enumerateStructures(task, this.#meter, (structure) => {
        this.#models.push({ structure, shows: [] });
        listed += 1;
        return listed < LISTED_MODELS;
      });
    }
    if (this.#models.length > 0) return;
    const infinite = this.#findInfinite(this.#sentences, jointSignature([this.#theory]));
    if (infinite !== null) this.#models.push({ structure: infinite, shows: [] });
  }

  /** @throws WorkEnded */
  find(sentence: Formula): ModelSearch {
    for (const model of this.#models)
      if (satisfies(model.structure, sentence, this.#meter)) {
        model.shows.push(sentence);
        return { kind: "found", size: model.structure.carrier.size };
      }
    if (this.#derive(not(sentence))) return { kind: "derived" };
    const sentences = [...this.#sentences, sentence];
    const bound = finiteCheckBound(sentences);
    const upTo = Math.min(this.#work.upTo, bound?.points ?? this.#work.upTo);
    const signature = jointSignature([this.#theory], [sentence]);
    const task = { sought: "a model", alternatives: [sentences], signature };
    const { found, search } = searchFinite(task, this.#meter, { ...this.#work, upTo });
    if (found !== null) {
      const { structure } = found;
      this.#models.push({ structure, shows: [sentence] });
      return { kind: "found", size: structure.carrier.size };
    }
    const infinite = this.#findInfinite(sentences, signature);
    if (infinite !== null) {
      this.#models.push({ structure: infinite, shows: [sentence] });
      return { kind: "found", size: null };
    }
    if (this.#meter.ended !== null) throw new WorkEnded(this.#meter.ended);
    const decided = bound !== null && search.noneUpTo >= bound.points ? bound : null;
    return { kind: "none", upTo: search.noneUpTo, decided };
  }

  /** An infinite structure that a short search meets. */
  #findInfinite(sentences: readonly Formula[], signature: Signature): Structure | null {
    const search = new InfiniteSearch({ sought: "a model", sentences, signature }, this.#meter, this.#work);
    search.advance(INFINITE_ROUND, INFINITE_STEPS);
    return search.found;
  }

  /** Whether a short search derives a sentence from the theory. */
  #derive(conclusion: Formula): boolean {
    const task = { premises: this.#sentences, conclusion };
    const search = new DerivationSearch(task, (onDerived) => new Solver({ observer: { onDerived } }));
    while (search.generated < DERIVATION_CLAUSES) {
      const outcome = search.next(this.#meter);
      if (outcome.result === "derived") this.#derived.push({ task, derivation: outcome.derivation });
      if (outcome.result !== "gave-up") return outcome.result === "derived";
    }
    return false;
  }

  /** What the models and derivations show, each in one fact; checked. */
  evidence(): Evidence | null {
    const writer = new EvidenceWriter();
    const axioms = writer.theory(this.#sentences);
    const showing = this.#models.filter(({ shows }) => shows.length > 0);
    for (const { structure, shows } of showing)
      writer.addStructure(structure, [...this.#sentences, ...shows], null);
    for (const { task, derivation } of this.#derived) writer.addDerivation(task, derivation);
    if (writer.isEmpty) return null;
    return certify(writer.finish({ ask: "models", axioms }, null), this.#work);
  }
}
