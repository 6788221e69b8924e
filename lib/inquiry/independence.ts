/** `independence T`: for each axiom, a structure where it alone fails, or a derivation from the others. */
import type { Theory } from "../logic/theory.ts";
import type { AxiomAnswer, IndependenceAnswer } from "./answer.ts";
import { certify } from "./certify.ts";
import { EvidenceWriter } from "./evidence-writer.ts";
import { jointSignature } from "./finite-search.ts";
import { recordQuestion } from "./question-record.ts";
import { Settler } from "./settle.ts";
import type { Work } from "./work.ts";

export function askIndependence(theory: Theory, work: Work): IndependenceAnswer {
  const writer = new EvidenceWriter();
  const question = recordQuestion({ ask: "independence", theory }, writer);
  const settler = new Settler(jointSignature([theory]), writer, work);
  const axioms = independenceOf(theory, settler);
  const verdicts = axioms.map((axiom) => axiom.verdict);
  const evidence = verdicts.some((verdict) => verdict !== "open")
    ? certify(writer.finish(question, verdicts), work)
    : null;
  return { question: "independence", verdict: null, steps: settler.steps, evidence, axioms };
}

/** The axioms one by one, each with an equal share of what is left of the budget. */
export function independenceOf(theory: Theory, settler: Settler): readonly AxiomAnswer[] {
  return theory.axioms.map((axiom, place): AxiomAnswer => {
    const settled = settler.settle(
      {
        premises: theory.axioms.filter((other) => other !== axiom),
        conclusions: [axiom],
        from: "from the other axioms",
        sought: `a structure where only ${axiom.label} fails`,
      },
      Math.max(1, Math.floor(settler.left / (theory.axioms.length - place))),
    );
    const { outcome, structure, search, report } = settled;
    return {
      label: axiom.label,
      verdict: outcome === "refuted" ? "independent" : outcome === "derived" ? "redundant" : "open",
      witness: structure,
      derivation: settled.derivations[0] ?? null,
      search,
      report,
    };
  });
}
