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

export interface FiniteSearchResult {
  readonly search: Search;
  readonly structure: Structure | null;
  /** Which alternative holds in the structure; −1 when none was found. */
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
 * Goes through 1, 2, … points until a structure is found, the sizes asked for are done or the meter ends: at each
 * size a short search for symmetric structures, then the complete search. Where that ends for good, larger sizes are
 * searched for symmetric structures alone, so that one may be found with smaller sizes unsettled.
 */
export function searchFinite(task: FiniteSearchTask, meter: Meter, work: Work): FiniteSearchResult {
  const { relations } = task.signature;
  const largest = Math.max(work.upTo, work.symmetricUpTo);
  const kept = largest > DEFAULT_LARGEST_SIZE ? 1 / SHARE_BEYOND : 0;
  const complete = new MeterShare(meter, (meter.left / 1000) * (1 - kept));
  const before = new MeterShare(complete.meter, meter.left / 1000 / SHARE_BEFORE);
  let noneUpTo = 0;
  let ended: EndReason | null = null;
  for (let size = 1; size <= work.upTo && ended === null; size += 1) {
    report(size, "");
    const symmetric = size < LEAST_SYMMETRIC_SIZE ? null : lookForSymmetric(size, before.meter, STEPS_BEFORE);
    if (symmetric !== null) return symmetric;
    const carrier = new Points(size);
    for (const [alternative, sentences] of task.alternatives.entries()) {
      const outcome = findStructure({ carrier, sentences, relations }, complete.meter);
      if (outcome.result === "found") return found(size, outcome.structure, alternative);
      if (outcome.result === "ended") {
        ended = outcome.reason;
        break;
      }
    }
    if (ended === null) noneUpTo = size;
  }
  settle();
  const endedAt = ended === null ? null : noneUpTo + 1;
  let symmetricUpTo: number | null = null;
  for (let size = Math.max(noneUpTo + 1, LEAST_SYMMETRIC_SIZE); size <= largest; size += 1) {
    if (meter.ended !== null || meter.left < 1000 || ended === "interrupted") break;
    report(size, ", symmetric ones only");
    const symmetric = lookForSymmetric(size, meter, STEPS_BEYOND);
    if (symmetric !== null) return symmetric;
    if (meter.ended === null) symmetricUpTo = size;
  }
  // Of an interrupt beyond the complete sizes the rest of a question must know.
  if (ended === null && meter.ended === "interrupted") ended = "interrupted";
  return {
    search: { sought: task.sought, noneUpTo, foundAt: null, ended, endedAt, symmetricUpTo },
    structure: null,
    alternative: -1,
  };

  function report(size: number, how: string): void {
    work.report(`${task.sought} on ${size} ${size === 1 ? "point" : "points"}${how}`);
  }

  function lookForSymmetric(size: number, payer: Meter, steps: number): FiniteSearchResult | null {
    const outcome = findSymmetric({ size, alternatives: task.alternatives, relations }, payer, steps);
    return outcome === null ? null : found(size, outcome.structure, outcome.alternative);
  }

  function found(size: number, structure: Structure, alternative: number): FiniteSearchResult {
    settle();
    return {
      search: {
        sought: task.sought,
        noneUpTo,
        foundAt: size,
        ended: null,
        endedAt: null,
        symmetricUpTo: null,
      },
      structure,
      alternative,
    };
  }

  function settle(): void {
    before.settle();
    complete.settle();
  }
}

/** The signature of several theories and some sentences together. */
export function jointSignature(theories: readonly Theory[], sentences: readonly Formula[] = []): Signature {
  const all = [...theories.flatMap((theory) => theory.axioms.map((axiom) => axiom.formula)), ...sentences];
  const fallback = theories.map((theory) => theory.fallback).find((relation) => relation !== null) ?? null;
  return signatureOf(all, fallback);
}
