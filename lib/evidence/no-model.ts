/** Checking clause proofs that there is no model on so many points. */

import type { Meter } from "../logic/meter.ts";
import type { FormulaRecord } from "../logic/records/formulas.ts";
import { groundForm } from "../logic/records/ground-form.ts";
import { Propagation } from "../logic/records/propagation.ts";
import type { NoModelFact } from "./format.ts";
import { reject } from "./read.ts";

/**
 * Checks that the axioms of a fact have no model of its size.
 * @throws Rejected
 */
export function checkNoModel(
  fact: NoModelFact,
  sentences: readonly FormulaRecord[],
  at: string,
  meter: Meter,
): void {
  const axioms = fact.axioms.map((index) => sentences[index]!);
  const { variables, clauses } = groundForm(axioms, fact.size, meter);
  const propagation = new Propagation(meter);
  for (const clause of clauses) propagation.add(clause);
  for (const [place, clause] of [...fact.proof, []].entries()) {
    if (clause.some((literal) => literal === 0 || Math.abs(literal) > variables))
      reject(`${at}, clause ${place} has a literal of no variable`);
    if (!propagation.follows(clause)) reject(`${at}, clause ${place} does not follow by unit propagation`);
    propagation.add(clause);
  }
}
