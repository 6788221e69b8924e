/** The search for finite structures, size by size. */
import { Points } from "../carriers/points.ts";
import type { Structure } from "../carriers/structure.ts";
import type { Formula } from "../logic/formula.ts";
import type { EndReason, Meter } from "../logic/meter.ts";
import { MeterShare } from "../logic/share.ts";
import { type Signature, signatureOf, type Theory } from "../logic/theory.ts";
import { findStructure } from "../structures/search.ts";
import { findSymmetric, LEAST_SYMMETRIC_SIZE } from "../structures/symmetric.ts";
import type { Search } from "./answer.ts";
import { DEFAULT_LARGEST_SIZE, type Work } from "./work.ts";

export interface FiniteSearchTask {
  /** What is sought, for people: "a countermodel". */
  readonly sought: string;
  /** Sets of sentences, any one of which is to hold in a structure; tried in this order at each size. */
  readonly alternatives: readonly (readonly Formula[])[];
  readonly signature: Signature;
}

export interface FoundStructure {
  readonly structure: Structure;
  /** Which alternative holds in the structure. */
  readonly alternative: number;
}

/** Steps for each group of symmetries and alternative before the complete search of a size … */
const STEPS_BEFORE = 50;
/** … which together are at most one part of so many of what there is. */
const SHARE_BEFORE = 50;
/** Steps for each group of symmetries and alternative beyond the sizes that are searched completely. */
const STEPS_BEYOND = 200;
/** What is kept of the budget for these sizes: one part of so many. */
const SHARE_BEYOND = 8;

/**
 * Goes through 1, 2, … points until a structure is found or all sizes asked for are done: at each size a short search
 * for symmetric structures, then the complete search. Where that has ended early, larger sizes may be searched for
 * symmetric structures alone, so that one may be found with smaller sizes unsettled. The search goes on where it was
 * whenever it is told to.
 */
export class FiniteSearch {
  found: FoundStructure | null = null;
  /** There is no structure on 1, …, this many points. */
  #noneUpTo = 0;
  #foundAt: number | null = null;
  /** Why the complete search of the next size ended; null when it has not been begun. */
  #ended: EndReason | null = null;
  /** Sizes up to this one had the short search for symmetric structures. */
  #shortUpTo = LEAST_SYMMETRIC_SIZE - 1;
  #symmetricUpTo: number | null = null;
  readonly #task: FiniteSearchTask;
  readonly #meter: Meter;
  readonly #work: Work;

  constructor(task: FiniteSearchTask, meter: Meter, work: Work) {
    this.#task = task;
    this.#meter = meter;
    this.#work = work;
  }

  /** Whether all sizes asked for are searched completely. */
  get isComplete(): boolean {
    return this.#noneUpTo >= this.#work.upTo;
  }

  /** Whether {@link advance} and {@link goBeyond} have nothing more to do. */
  get isExhausted(): boolean {
    const largest = Math.max(this.#work.upTo, this.#work.symmetricUpTo);
    return this.isComplete && (this.#symmetricUpTo ?? this.#noneUpTo) >= largest;
  }

  get search(): Search {
    return {
      sought: this.#task.sought,
      noneUpTo: this.#noneUpTo,
      foundAt: this.#foundAt,
      ended: this.found === null ? this.#ended : null,
      endedAt: this.found === null && this.#ended !== null ? this.#noneUpTo + 1 : null,
      symmetricUpTo: this.found === null ? this.#symmetricUpTo : null,
      noneOnCarriers: 0,
      configurations: null,
    };
  }

  /** Searches the sizes up to `size` (and those asked for) completely, within so many steps. */
  advance(size: number, steps: number): void {
    const complete = new MeterShare(this.#meter, steps);
    const before = new MeterShare(complete.meter, steps / SHARE_BEFORE);
    try {
      const last = Math.min(size, this.#work.upTo);
      while (this.found === null && this.#noneUpTo < last && complete.ended === null) {
        const next = this.#noneUpTo + 1;
        this.#report(next, "");
        this.#ended = null;
        if (next > this.#shortUpTo) {
          this.#shortUpTo = next;
          if (this.#searchSymmetric(next, before.meter, STEPS_BEFORE)) return;
        }
        this.#searchSize(next, complete.meter);
      }
    } finally {
      before.settle();
      complete.settle();
      // Of an interrupt the rest of a question must know. A part that was told to stop does not know why.
      if (this.#ended === "interrupted" || this.#meter.ended === "interrupted") this.#ended = complete.ended;
    }
  }

  /** Searches for symmetric structures on the sizes that are not searched completely, within so many steps. */
  goBeyond(steps: number): void {
    const share = new MeterShare(this.#meter, Math.max(1, steps));
    this.#goBeyond(share);
    share.settle();
    if (this.#ended === null && this.#meter.ended === "interrupted") this.#ended = "interrupted";
  }

  #goBeyond(share: MeterShare): void {
    const largest = Math.max(this.#work.upTo, this.#work.symmetricUpTo);
    const first = Math.max(this.#noneUpTo + 1, (this.#symmetricUpTo ?? 0) + 1, LEAST_SYMMETRIC_SIZE);
    for (let size = first; size <= largest; size += 1) {
      if (share.ended !== null || share.meter.left < 1000 || this.#ended === "interrupted") return;
      this.#report(size, ", symmetric ones only");
      if (this.#searchSymmetric(size, share.meter, STEPS_BEYOND)) return;
      if (share.ended === null) this.#symmetricUpTo = size;
    }
  }

  #searchSize(size: number, meter: Meter): void {
    const { alternatives, signature } = this.#task;
    const carrier = new Points(size);
    for (const [alternative, sentences] of alternatives.entries()) {
      const outcome = findStructure({ carrier, sentences, relations: signature.relations }, meter);
      if (outcome.result === "found") {
        this.#keep(size, { structure: outcome.structure, alternative });
        return;
      }
      if (outcome.result === "ended") {
        this.#ended = outcome.reason;
        return;
      }
    }
    this.#noneUpTo = size;
  }

  #searchSymmetric(size: number, payer: Meter, steps: number): boolean {
    const { alternatives, signature } = this.#task;
    const outcome = findSymmetric({ size, alternatives, relations: signature.relations }, payer, steps);
    if (outcome !== null) this.#keep(size, outcome);
    return outcome !== null;
  }

  #keep(size: number, found: FoundStructure): void {
    this.found = found;
    this.#foundAt = size;
  }

  #report(size: number, how: string): void {
    this.#work.report(`${this.#task.sought} on ${size} ${size === 1 ? "point" : "points"}${how}`);
  }
}

/** The part of a budget that the complete search may have, where larger sizes are to be looked at as well. */
export function shareOfComplete(work: Work): number {
  return Math.max(work.upTo, work.symmetricUpTo) > DEFAULT_LARGEST_SIZE ? 1 - 1 / SHARE_BEYOND : 1;
}

/** Goes through all sizes asked for until a structure is found, all are done, or the meter ends. */
export function searchFinite(task: FiniteSearchTask, meter: Meter, work: Work): FiniteSearch {
  const search = new FiniteSearch(task, meter, work);
  search.advance(work.upTo, (meter.left / 1000) * shareOfComplete(work));
  if (search.found === null) search.goBeyond(meter.left / 1000);
  return search;
}

/** The signature of several theories and some sentences together. */
export function jointSignature(theories: readonly Theory[], sentences: readonly Formula[] = []): Signature {
  const all = [...theories.flatMap((theory) => theory.axioms.map((axiom) => axiom.formula)), ...sentences];
  const fallback = theories.map((theory) => theory.fallback).find((relation) => relation !== null) ?? null;
  return signatureOf(all, fallback);
}
