/** The two kinds of structures that answers show: on carriers, which decide every sentence, and of free terms, which do not. */
import type { CertificateRecord, TermsRecord } from "./free-terms.ts";
import type { Structure } from "./structure.ts";

/** A structure of free terms that was found for some sentences. */
export interface TermStructure {
  readonly terms: TermsRecord;
  /** Why the sentences that it was found for are true in it, one for each, in their order. */
  readonly certificates: readonly CertificateRecord[];
}

export type AnyStructure = Structure | TermStructure;

export function isOfTerms(structure: AnyStructure): structure is TermStructure {
  return "terms" in structure;
}

/** How many elements; null for infinitely many. */
export function sizeOf(structure: AnyStructure): number | null {
  return isOfTerms(structure) ? null : structure.carrier.size;
}
