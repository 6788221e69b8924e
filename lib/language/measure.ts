/** How large a formula or a theory is, and how deeply it nests. */
import { type Formula, partsOf } from "../logic/formula.ts";
import type { Theory } from "../logic/theory.ts";

export interface Measure {
  /** The number of subformulas, each occurrence counted. */
  readonly parts: number;
  /** How many subformulas lie one inside another at most; 1 for an atom. */
  readonly nesting: number;
}

const formulaMeasures = new WeakMap<Formula, Measure>();
const theoryMeasures = new WeakMap<Theory, Measure>();

/** The measure of a formula; remembered for the formula itself, not for its parts. */
export function measureFormula(formula: Formula): Measure {
  const known = formulaMeasures.get(formula);
  if (known !== undefined) return known;
  let parts = 0;
  const nestingOf = (part: Formula): number => {
    parts += 1;
    let inner = 0;
    for (const next of partsOf(part)) inner = Math.max(inner, nestingOf(next));
    return inner + 1;
  };
  const nesting = nestingOf(formula);
  const measure = { parts, nesting };
  formulaMeasures.set(formula, measure);
  return measure;
}

/** The parts of all axioms together, and the nesting of the deepest one. */
export function measureTheory(theory: Theory): Measure {
  const known = theoryMeasures.get(theory);
  if (known !== undefined) return known;
  let parts = 0;
  let nesting = 0;
  for (const axiom of theory.axioms) {
    const measure = measureFormula(axiom.formula);
    parts += measure.parts;
    nesting = Math.max(nesting, measure.nesting);
  }
  const measure = { parts, nesting };
  theoryMeasures.set(theory, measure);
  return measure;
}
