/** `minimise T`: the irredundant sets of axioms from which all others follow. */
import { isOfTerms } from "../carriers/any-structure.ts";
import type { Structure } from "../carriers/structure.ts";
import type { Formula } from "../logic/formula.ts";
import { type EndReason, Meter, WorkEnded } from "../logic/meter.ts";
import type { Axiom, Theory } from "../logic/theory.ts";
import { satisfies } from "../structures/evaluate.ts";
import type { MinimalSet, MinimiseAnswer, ShownDerivation } from "./answer.ts";
import { certify } from "./certify.ts";
import { EvidenceWriter } from "./evidence-writer.ts";
import { jointSignature } from "./finite-search.ts";
import { recordQuestion } from "./question-record.ts";
import { Settler } from "./settle.ts";
import type { Work } from "./work.ts";

/** Each set may cost one part of so many of what is left of the budget … */
const SHARE = 10;
/** … and none is begun with fewer steps than this. */
const LEAST_STEPS = 20;

/** Steps for one axiom in an infinite structure. */
const STEPS_ON_INFINITE = 200;

/**
 * Goes through the sets of axioms, as bit masks, largest first (after Liffiton, Previti, Malik & Marques-Silva 2016): one
 * from which all axioms follow is made smaller until it is irredundant, and with it all larger sets are known; a
 * structure in which just some axioms hold shows of all sets of these that they are too weak.
 * @param theory with at most {@link MOST_MINIMISED} axioms
 */
export function minimise(theory: Theory, work: Work): MinimiseAnswer {
  const writer = new EvidenceWriter();
  const question = recordQuestion({ ask: "minimise", theory }, writer);
  const settler = new Settler(jointSignature([theory]), writer, work);
  const sets = new Sets(theory.axioms, settler, work);
  const ended = sets.explore();
  for (const set of sets.minimal)
    for (const [place, structure] of set.witnesses)
      writer.addStructure(
        structure,
        theory.axioms
          .filter((_, other) => other !== place && (set.mask >> other) & 1)
          .map((axiom) => axiom.formula),
        [theory.axioms[place]!.formula],
      );
  // What shows that there are no other sets: each set that is too weak has such a structure.
  const complete = ended === null && sets.open.length === 0;
  const sentences = theory.axioms.map(({ formula }) => formula);
  if (complete)
    for (const { mask, structure } of sets.weak)
      writer.addStructure(
        structure,
        placesOf(mask, theory.axioms).map((place) => sentences[place]!),
        sentences,
      );
  const verdicts = sets.minimal.map(({ mask }) => placesOf(mask, theory.axioms).join(","));
  if (complete) verdicts.unshift("complete");
  return {
    question: "minimise",
    verdict: null,
    steps: settler.steps,
    evidence: verdicts.length === 0 ? null : certify(writer.finish(question, verdicts), work),
    sets: sets.minimal.map(
      ({ mask, derivations, witnesses }): MinimalSet => ({
        labels: labelsOf(mask, theory.axioms),
        derivations,
        witnesses: placesOf(mask, theory.axioms).map((place) => witnesses.get(place)!),
      }),
    ),
    complete,
    open: sets.open.map((mask) => labelsOf(mask, theory.axioms)),
    ended,
  };
}

function placesOf(mask: number, axioms: readonly Axiom[]): readonly number[] {
  return axioms.flatMap((_, place) => ((mask >> place) & 1 ? [place] : []));
}

function labelsOf(mask: number, axioms: readonly Axiom[]): readonly string[] {
  return placesOf(mask, axioms).map((place) => axioms[place]!.label);
}

interface FoundSet {
  readonly mask: number;
  readonly derivations: readonly ShownDerivation[];
  /** By the place of an axiom of the set: a structure where it alone of the set fails. */
  readonly witnesses: ReadonlyMap<number, Structure>;
}

/** `a, b and c` */
function listLabels(labels: readonly string[]): string {
  if (labels.length === 0) return "no axioms";
  return labels.length === 1 ? labels[0]! : `${labels.slice(0, -1).join(", ")} and ${labels.at(-1)}`;
}

/** What is known of the sets of axioms. Bit i of a mask is axiom i. */
class Sets {
  readonly minimal: FoundSet[] = [];
  /** Sets of which nothing could be found out. */
  readonly open: number[] = [];
  /** Structures, each with the axioms that hold in it: not all. */
  readonly weak: { readonly mask: number; readonly structure: Structure }[] = [];
  /** Sets from which all axioms follow. */
  readonly #strong: number[] = [];
  readonly #axioms: readonly Axiom[];
  readonly #settler: Settler;
  readonly #work: Work;

  constructor(axioms: readonly Axiom[], settler: Settler, work: Work) {
    this.#axioms = axioms;
    this.#settler = settler;
    this.#work = work;
  }

  /** @returns why it ended before all sets were known; null when they are, but for the open ones */
  explore(): EndReason | null {
    for (;;) {
      const seed = this.#nextSeed();
      if (seed === null) return null;
      if (this.#settler.interrupted) return "interrupted";
      if (this.#settler.left < LEAST_STEPS) return "budget";
      const derivations = this.#ask(seed);
      if (derivations !== null) this.#shrink(seed, derivations);
    }
  }

  /** The largest set of which nothing is known. */
  #nextSeed(): number | null {
    let best: number | null = null;
    for (let mask = 2 ** this.#axioms.length - 1; mask >= 0; mask -= 1)
      if ((best === null || sizeOf(mask) > sizeOf(best)) && this.#isUnknown(mask)) best = mask;
    return best;
  }

  #isUnknown(mask: number): boolean {
    return (
      !this.#strong.some((known) => (known & mask) === known) &&
      this.#witness(mask) === null &&
      !this.open.includes(mask)
    );
  }

  /** A structure in which all of the set hold, and not all axioms. */
  #witness(mask: number): Structure | null {
    return this.weak.find((weak) => (weak.mask & mask) === mask)?.structure ?? null;
  }

  /** The derivations of all other axioms from the set; null when it is too weak or open, which is noted. */
  #ask(mask: number): readonly ShownDerivation[] | null {
    if (this.open.includes(mask) || this.#witness(mask) !== null) return null;
    const isIn = (place: number) => ((mask >> place) & 1) === 1;
    const conclusions = this.#axioms.filter((_, place) => !isIn(place));
    // The whole, from which nothing is to be derived.
    if (conclusions.length === 0) return [];
    const settled = this.#settler.settle(
      {
        premises: this.#axioms.filter((_, place) => isIn(place)),
        conclusions,
        from: `from ${listLabels(labelsOf(mask, this.#axioms))}`,
        sought: "a structure where not all axioms hold",
        decides: true,
      },
      Math.max(1, Math.floor(this.#settler.left / SHARE)),
    );
    const { structure } = settled;
    if (structure !== null && !isOfTerms(structure)) this.#note(structure, mask);
    else if (settled.outcome === "open") this.open.push(mask);
    return settled.outcome === "derived" ? settled.derivations : null;
  }

  /** @param known axioms that hold in the structure */
  #note(structure: Structure, known: number): void {
    let mask = known;
    for (const [place, { formula }] of this.#axioms.entries())
      if ((known & (1 << place)) === 0 && this.#holds(structure, formula)) mask |= 1 << place;
    this.weak.push({ mask, structure });
  }

  /** Whether a sentence is seen to hold. Deep ones on an infinite structure are given up early. */
  #holds(structure: Structure, sentence: Formula): boolean {
    const steps = structure.carrier.size === null ? STEPS_ON_INFINITE : Number.POSITIVE_INFINITY;
    const meter = new Meter(steps, this.#work.isInterrupted);
    try {
      return satisfies(structure, sentence, meter);
    } catch (problem) {
      if (!(problem instanceof WorkEnded) || meter.ended === "interrupted") throw problem;
      return false;
    }
  }

  /** Leaves axioms out, the last ones first, until the set is irredundant. */
  #shrink(from: number, derivationsOf: readonly ShownDerivation[]): void {
    let mask = from;
    let derivations = derivationsOf;
    const witnesses = new Map<number, Structure>();
    for (const place of placesOf(from, this.#axioms).toReversed()) {
      const smaller = mask & ~(1 << place);
      const found = this.#ask(smaller);
      if (found !== null) {
        mask = smaller;
        derivations = found;
        continue;
      }
      const witness = this.#witness(smaller);
      if (witness !== null) witnesses.set(place, witness);
    }
    this.#strong.push(mask);
    // Witnesses of a larger set are witnesses of this one; where one is lacking the set may be redundant.
    if (placesOf(mask, this.#axioms).every((place) => witnesses.has(place)))
      this.minimal.push({ mask, derivations, witnesses });
  }
}

function sizeOf(mask: number): number {
  let bits = 0;
  for (let rest = mask; rest !== 0; rest &= rest - 1) bits += 1;
  return bits;
}
