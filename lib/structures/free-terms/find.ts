/** The search for a structure of free terms in which sentences are true. */
import type { CertificateRecord, TermsRecord } from "../../carriers/free-terms.ts";
import { checkCertificate } from "../../carriers/free-terms-check.ts";
import type { Formula, RelationSymbol } from "../../logic/formula.ts";
import { type Meter, WorkEnded } from "../../logic/meter.ts";
import { type FormulaRecord, Growth, recordFormula } from "../../logic/records/formulas.ts";
import { MeterShare } from "../../logic/share.ts";
import { constructorsOf } from "./bounds.ts";
import { candidates } from "./candidates.ts";
import { CertificateSearch } from "./certificates.ts";
import { Sample } from "./sample.ts";

/** Steps that the whole search may take, and the search for certificates in one structure. */
const MOST_STEPS = 1_000;
const STEPS_FOR_ONE = 300;
/** Structures that are looked at. */
const MOST_CANDIDATES = 200;
/** Symbols that the terms of a certificate may have together, cases counted as some. */
const LARGEST_CERTIFICATE = 10;

export interface CertifiedTerms {
  readonly record: TermsRecord;
  /** One for each sentence, in order. */
  readonly certificates: readonly CertificateRecord[];
}

/**
 * Looks for a structure of free terms in which all sentences are true, with a certificate for each. It is the same on
 * every machine.
 * @param sentences closed
 * @param relations all that occur in the sentences, and others that the structure is to interpret
 * @throws WorkEnded when the meter's budget ends or the user interrupts
 */
export function findFreeTerms(
  sentences: readonly Formula[],
  relations: readonly RelationSymbol[],
  meter: Meter,
): CertifiedTerms | null {
  const records = sentences.map(recordFormula);
  return within(meter, MOST_STEPS, (whole) => {
    const growth = new Growth(Number.POSITIVE_INFINITY, whole);
    const wanted = constructorsOf(records, growth);
    let left = MOST_CANDIDATES;
    for (const record of candidates(wanted, relations, growth)) {
      if (left === 0) return null;
      left -= 1;
      const sample = new Sample(record, whole);
      if (!records.every((sentence) => sample.seemsTrue(sentence))) continue;
      const certificates = within(whole, STEPS_FOR_ONE, (one) => certify(record, records, one));
      if (certificates !== null) return { record, certificates };
    }
    return null;
  });
}

/**
 * Certificates that sentences are true in a structure of free terms, one for each.
 * @returns null when some sentence has none of a bounded size
 * @throws WorkEnded when the meter's budget ends or the user interrupts
 */
export function certify(
  record: TermsRecord,
  sentences: readonly FormulaRecord[],
  meter: Meter,
): readonly CertificateRecord[] | null {
  const search = new CertificateSearch(record, new Growth(Number.POSITIVE_INFINITY, meter));
  const found = new Map<FormulaRecord, CertificateRecord>();
  for (let size = 0; size <= LARGEST_CERTIFICATE; size += 1) {
    for (const sentence of sentences) {
      if (found.has(sentence)) continue;
      const certificate = search.find(sentence, size);
      if (certificate === null) continue;
      if (!checkCertificate(record, sentence, certificate, meter)) return null;
      found.set(sentence, certificate);
    }
    if (found.size === new Set(sentences).size) return sentences.map((sentence) => found.get(sentence)!);
  }
  return null;
}

/** Work within a part of the meter; null when that part ends. */
function within<Result>(whole: Meter, steps: number, work: (meter: Meter) => Result | null): Result | null {
  const share = new MeterShare(whole, steps);
  try {
    return work(share.meter);
  } catch (problem) {
    if (problem instanceof WorkEnded && share.ended === "budget" && whole.ended === null) return null;
    throw problem;
  } finally {
    share.settle();
  }
}
