/**
 * The checker: accepts evidence only when every fact in it is true and the facts bear out the verdict. It does not
 * search, and trusts nothing that a search has written. What it relies on is this folder, `lib/carriers` and
 * `lib/logic`.
 */

import { readCertificate } from "../carriers/free-terms.ts";
import { checkCertificate } from "../carriers/free-terms-check.ts";
import { DEFAULT_BUDGET, Meter, type Poll, WorkEnded } from "../logic/meter.ts";
import { FormulaTooLarge } from "../logic/records/formulas.ts";
import { checkDerivation } from "./derivation.ts";
import { digestOf } from "./digest.ts";
import { evaluatorOf } from "./evaluate.ts";
import type { FormulaRecord, StructureFact, TermsFact } from "./format.ts";
import { checkNoFiniteModel } from "./no-finite-model.ts";
import { checkNoModel } from "./no-model.ts";
import { Rejected, readEvidence, reject } from "./read.ts";
import { isBorneOut } from "./verdicts.ts";

export type CheckResult =
  | { readonly accepted: true; readonly steps: number }
  | { readonly accepted: false; readonly reason: string };

/** A check may take so many times the steps of the question. */
const STEPS_FOR_EACH = 2;

/**
 * The meter of a check: evidence that is accepted once is accepted by every check with the same budget.
 * @param budget steps that the question may take; checks of small questions are not cut short
 */
export function meterForCheck(budget: number = DEFAULT_BUDGET, isInterrupted?: Poll): Meter {
  return new Meter(STEPS_FOR_EACH * Math.max(budget, DEFAULT_BUDGET), isInterrupted);
}

/**
 * Checks evidence of any origin.
 * @param meter bounds the check; when it ends, the evidence is not accepted
 */
export function checkEvidence(value: unknown, meter: Meter = meterForCheck()): CheckResult {
  try {
    const evidence = readEvidence(value);
    const { sentences, facts } = evidence;
    if (evidence.digest !== digestOf(sentences, evidence.question))
      reject("the digest is not that of the question");
    for (const [index, fact] of facts.entries()) {
      const at = `fact ${index}`;
      if (fact.fact === "structure") checkStructure(fact, sentences, at, meter);
      else if (fact.fact === "terms") checkTerms(fact, sentences, at, meter);
      else if (fact.fact === "derivation") checkDerivation(fact, sentences, at, meter);
      else if (fact.fact === "no-model") checkNoModel(fact, sentences, at, meter);
      else checkNoFiniteModel(fact, evidence, at, meter);
    }
    if (!isBorneOut(evidence, meter))
      reject(`the facts do not bear out the verdict ${JSON.stringify(evidence.verdict)}`);
    return { accepted: true, steps: meter.steps };
  } catch (problem) {
    if (problem instanceof Rejected) return { accepted: false, reason: problem.message };
    if (problem instanceof WorkEnded)
      return { accepted: false, reason: `the check ended early: ${problem.reason}` };
    // A RangeError is JavaScript's: no stack or no room left for what hostile evidence asks for.
    if (problem instanceof FormulaTooLarge || problem instanceof RangeError)
      return { accepted: false, reason: "a formula, a term or a clause form is too large" };
    throw problem;
  }
}

function checkStructure(
  { structure, holds, fails }: StructureFact,
  sentences: readonly FormulaRecord[],
  at: string,
  meter: Meter,
): void {
  const evaluate = evaluatorOf(structure, at, meter);
  const isTrue = (index: number) => evaluate(sentences[index]!);
  const wrong = holds.find((index) => !isTrue(index));
  if (wrong !== undefined) reject(`${at}: sentence ${wrong} is said to hold in the structure and does not`);
  if (fails?.every(isTrue))
    reject(`${at}: sentences ${fails.join(", ")} are said to fail in the structure and all hold`);
}

function checkTerms(
  { terms, holds, fails, certificates }: TermsFact,
  sentences: readonly FormulaRecord[],
  at: string,
  meter: Meter,
): void {
  const shown = holds.map((index) => sentences[index]!);
  if (fails !== null) {
    const all = fails.map((index) => sentences[index]!);
    shown.push(["not", all.length === 1 ? all[0]! : ["and", ...all]]);
  }
  if (certificates.length !== shown.length) reject(`${at}: there must be ${shown.length} certificates`);
  for (const [place, sentence] of shown.entries()) {
    const certificate = readCertificate(certificates[place], terms);
    if (certificate === null || !checkCertificate(terms, sentence, certificate, meter))
      reject(`${at}: certificate ${place} does not show that its sentence is true`);
  }
}
