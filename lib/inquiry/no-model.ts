/**
 * Clause proofs that sentences have no model on so many points: the solver's own derived clauses, cut down to those
 * that its contradiction needs. The checker makes the same propositional form and follows the proof on it.
 */
import type { NoModelFact } from "../evidence/format.ts";
import type { Formula } from "../logic/formula.ts";
import { type Meter, WorkEnded } from "../logic/meter.ts";
import { FormulaTooLarge, recordFormula } from "../logic/records/formulas.ts";
import { type GroundForm, groundForm } from "../logic/records/ground-form.ts";
import { MeterShare } from "../logic/share.ts";
import { Solver } from "../structures/sat/solver.ts";
import { trimProof } from "./proof-trimming.ts";

/** Literals in a proof beyond which it is not given. */
const LARGEST_PROOF = 400_000;
/** Literals of derived clauses beyond which the search for a proof ends. */
const LARGEST_UNTRIMMED = 10_000_000;
/** What of the meter the search may spend; trimming looks at what the search has done once more. */
const SEARCH_SHARE = 1 / 2;

/**
 * A proof that the sentences have no model on `size` points.
 * @param meter pays for form, search and trimming
 * @returns null when they have one, when the proof is very long, or when the meter ends: it says why
 */
export function proveNoModel(
  sentences: readonly Formula[],
  size: number,
  meter: Meter,
): NoModelFact["proof"] | null {
  const share = new MeterShare(meter, (meter.left / 1000) * SEARCH_SHARE);
  try {
    const form = groundForm(sentences.map(recordFormula), size, share.meter);
    const derived = refute(form, share.meter);
    share.settle();
    if (derived === null) return null;
    const proof = trimProof(form, derived, meter);
    return proof.reduce((sum, clause) => sum + clause.length, 0) > LARGEST_PROOF ? null : proof;
  } catch (problem) {
    if (problem instanceof WorkEnded || problem instanceof FormulaTooLarge) return null;
    throw problem;
  } finally {
    share.settle();
  }
}

/** The clauses that the solver derives until it has none left to satisfy; null when it does not get there. */
function refute(form: GroundForm, meter: Meter): readonly (readonly number[])[] | null {
  const derived: (readonly number[])[] = [];
  let literals = 0;
  const onDerived = (clause: readonly number[]) => {
    literals += clause.length;
    if (literals <= LARGEST_UNTRIMMED) derived.push(clause);
  };
  const solver = new Solver({ observer: { onDerived } });
  solver.reserve(form.variables);
  while (solver.variableCount < form.variables) solver.newVariable();
  for (const clause of form.clauses) solver.addClause(clause);
  const outcome = solver.solve(meter);
  return outcome === "unsatisfiable" && literals <= LARGEST_UNTRIMMED ? derived : null;
}
