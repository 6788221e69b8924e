/** `check-finite T`: has the theory finite models, none, or only infinite ones? */

import { sentencesOf, type Theory } from "../logic/theory.ts";
import type { FiniteAnswer } from "./answer.ts";
import { certify } from "./certify.ts";
import { EvidenceWriter } from "./evidence-writer.ts";
import { jointSignature, searchFinite } from "./finite-search.ts";
import { meterFor, type Work } from "./work.ts";

/** `finite` with a smallest model, or `open` with the sizes that have none. */
export function checkFinite(theory: Theory, work: Work): FiniteAnswer {
  const writer = new EvidenceWriter();
  const sentences = sentencesOf(theory);
  const axioms = writer.theory(sentences);
  const meter = meterFor(work);
  const signature = jointSignature([theory]);
  const { structure, search } = searchFinite(
    { sought: "a model", alternatives: [sentences], signature },
    meter,
    work,
  );
  const result = {
    question: "check-finite",
    steps: meter.steps,
    noModelUpTo: search.noneUpTo,
    model: structure,
    search,
  } as const;
  if (structure === null)
    return { ...result, verdict: "open", evidence: null, leastSize: null, modelSize: null };
  writer.addStructure(structure, sentences, null);
  return {
    ...result,
    verdict: "finite",
    evidence: certify(writer.finish({ ask: "check-finite", axioms }, "finite"), work),
    leastSize: search.foundAt === search.noneUpTo + 1 ? search.foundAt : null,
    modelSize: search.foundAt,
  };
}
