/** The search for infinite structures, carrier by carrier. */
import { buildCarrier } from "../carriers/build.ts";
import type { Structure } from "../carriers/structure.ts";
import { recordStructure } from "../carriers/structure-record.ts";
import { evaluatorOf } from "../evidence/evaluate.ts";
import type { Formula } from "../logic/formula.ts";
import { type Meter, WorkEnded } from "../logic/meter.ts";
import { recordFormula } from "../logic/records/formulas.ts";
import { MeterShare } from "../logic/share.ts";
import type { Signature } from "../logic/theory.ts";
import { findLazily } from "../structures/lazy-search.ts";
import { CARRIERS } from "./carrier-list.ts";
import type { Work } from "./work.ts";

export interface InfiniteSearchTask {
  /** What is sought, for people: "a countermodel". */
  readonly sought: string;
  /** All are to hold in the structure. */
  readonly sentences: readonly Formula[];
  readonly signature: Signature;
}

/** Rounds through the list of carriers: how many of them, and steps for each. Each round costs a few times the one before. */
export const ROUNDS: readonly { readonly carriers: number; readonly steps: number }[] = [
  { carriers: 11, steps: 20 },
  { carriers: 26, steps: 100 },
  { carriers: Number.POSITIVE_INFINITY, steps: 400 },
  { carriers: Number.POSITIVE_INFINITY, steps: 4_000 },
  { carriers: Number.POSITIVE_INFINITY, steps: 40_000 },
];

/** Steps for the check of a structure that was found. */
const CHECK_STEPS = 20_000;

/**
 * Goes through the carriers in rounds of growing effort until a structure is found. A carrier that was searched completely
 * is not searched again.
 */
export class InfiniteSearch {
  found: Structure | null = null;
  /** Numbers of carriers on which there is no such structure. */
  readonly #none = new Set<number>();
  readonly #task: InfiniteSearchTask;
  readonly #meter: Meter;
  readonly #work: Work;
  /** The round that comes next, and the carrier in it. */
  #round = 0;
  #next = 0;

  constructor(task: InfiniteSearchTask, meter: Meter, work: Work) {
    this.#task = task;
    this.#meter = meter;
    this.#work = work;
  }

  /** How many carriers are shown to have no such structure. */
  get noneOn(): number {
    return this.#none.size;
  }

  /** Whether {@link advance} has nothing more to do. */
  get isExhausted(): boolean {
    return this.found !== null || this.#round >= ROUNDS.length || this.#none.size === CARRIERS.length;
  }

  /** Goes on to the end of a round, counted from 0, within so many steps. It goes on where it stopped the next time. */
  advance(round: number, steps: number): void {
    const share = new MeterShare(this.#meter, Math.max(1, steps));
    while (this.found === null && this.#round <= round && !this.isExhausted && share.ended === null) {
      const { carriers, steps: each } = ROUNDS[this.#round]!;
      if (this.#next >= Math.min(carriers, CARRIERS.length)) {
        this.#round += 1;
        this.#next = 0;
        continue;
      }
      this.#search(this.#next, share, each);
      if (share.ended === null) this.#next += 1;
    }
    share.settle();
  }

  #search(number: number, payer: MeterShare, steps: number): void {
    if (this.#none.has(number)) return;
    this.#work.report(`${this.#task.sought} on infinite carrier ${number + 1} of ${CARRIERS.length}`);
    const share = new MeterShare(payer.meter, steps);
    const { sentences, signature } = this.#task;
    const carrier = buildCarrier(CARRIERS[number]!);
    const outcome = findLazily({ carrier, sentences, relations: signature.relations }, share.meter);
    share.settle();
    if (outcome.result === "found" && this.#isChecked(outcome.structure, payer))
      this.found = outcome.structure;
    if (outcome.result === "none") this.#none.add(number);
  }

  /**
   * Whether the checker's evaluator comes to an end on the structure: what it cannot finish is no evidence, however the
   * search has come to it.
   */
  #isChecked(structure: Structure, payer: MeterShare): boolean {
    const share = new MeterShare(payer.meter, CHECK_STEPS);
    try {
      const isTrue = evaluatorOf(recordStructure(structure), "the structure", share.meter);
      for (const sentence of this.#task.sentences)
        if (!isTrue(recordFormula(sentence))) throw new Error("the two evaluators do not agree");
      return true;
    } catch (problem) {
      if (!(problem instanceof WorkEnded)) throw problem;
      return false;
    } finally {
      share.settle();
    }
  }
}
