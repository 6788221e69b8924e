/** The search for finite structures, size by size. */
import { Points } from "../carriers/points.ts";
import type { Structure } from "../carriers/structure.ts";
import type { Formula } from "../logic/formula.ts";
import type { Meter } from "../logic/meter.ts";
import { type Signature, signatureOf, type Theory } from "../logic/theory.ts";
import { findStructure } from "../structures/search.ts";
import type { Search } from "./answer.ts";
import type { Work } from "./work.ts";

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

/** Goes through 1, 2, … points until a structure is found, the sizes asked for are done or the meter ends. */
export function searchFinite(task: FiniteSearchTask, meter: Meter, work: Work): FiniteSearchResult {
  const search = { sought: task.sought, noneUpTo: 0, foundAt: null, ended: null, endedAt: null };
  for (let size = 1; size <= work.upTo; size += 1) {
    work.report(`${task.sought} on ${size} ${size === 1 ? "point" : "points"}`);
    const carrier = new Points(size);
    for (const [alternative, sentences] of task.alternatives.entries()) {
      const outcome = findStructure({ carrier, sentences, relations: task.signature.relations }, meter);
      if (outcome.result === "found")
        return {
          search: { ...search, noneUpTo: size - 1, foundAt: size },
          structure: outcome.structure,
          alternative,
        };
      if (outcome.result === "ended")
        return {
          search: { ...search, noneUpTo: size - 1, ended: outcome.reason, endedAt: size },
          structure: null,
          alternative: -1,
        };
    }
  }
  return { search: { ...search, noneUpTo: work.upTo }, structure: null, alternative: -1 };
}

/** The signature of several theories and some sentences together. */
export function jointSignature(theories: readonly Theory[], sentences: readonly Formula[] = []): Signature {
  const all = [...theories.flatMap((theory) => theory.axioms.map((axiom) => axiom.formula)), ...sentences];
  const fallback = theories.map((theory) => theory.fallback).find((relation) => relation !== null) ?? null;
  return signatureOf(all, fallback);
}
