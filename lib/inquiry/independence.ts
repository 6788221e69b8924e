/** `independence T`: for each axiom, a structure where it alone fails. */

import { not } from "../logic/formula.ts";
import { sentencesOf, type Theory } from "../logic/theory.ts";
import type { AxiomAnswer, IndependenceAnswer } from "./answer.ts";
import { certify } from "./certify.ts";
import { EvidenceWriter } from "./evidence-writer.ts";
import { jointSignature, searchFinite } from "./finite-search.ts";
import { meterFor, type Work } from "./work.ts";

export function askIndependence(theory: Theory, work: Work): IndependenceAnswer {
  const writer = new EvidenceWriter();
  const axiomNumbers = writer.theory(sentencesOf(theory));
  const { axioms, steps } = independenceOf(theory, writer, work);
  const verdicts = axioms.map((axiom) => axiom.verdict);
  const evidence = verdicts.includes("independent")
    ? certify(writer.finish({ ask: "independence", axioms: axiomNumbers }, verdicts), work)
    : null;
  return { question: "independence", verdict: null, steps, evidence, axioms };
}

/** The axioms one by one, each with an equal share of the budget; what is found is added to the evidence. */
export function independenceOf(
  theory: Theory,
  writer: EvidenceWriter,
  work: Work,
): { readonly axioms: readonly AxiomAnswer[]; readonly steps: number } {
  const signature = jointSignature([theory]);
  let steps = 0;
  const axioms = theory.axioms.map((axiom): AxiomAnswer => {
    const others = theory.axioms.filter((other) => other !== axiom).map((other) => other.formula);
    const meter = meterFor(work, theory.axioms.length);
    const sought = `a structure where only ${axiom.label} fails`;
    const alternatives = [[...others, not(axiom.formula)]];
    const { structure, search } = searchFinite({ sought, alternatives, signature }, meter, work);
    steps += meter.steps;
    if (structure !== null) writer.addStructure(structure, others, [axiom.formula]);
    return {
      label: axiom.label,
      verdict: structure === null ? "open" : "independent",
      witness: structure,
      search,
    };
  });
  return { axioms, steps };
}
