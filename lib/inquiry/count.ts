/** `count T up to n`: how many models there are of each size, labelled and up to isomorphism. */

import { sentencesOf, type Theory } from "../logic/theory.ts";
import { countStructures } from "../structures/count.ts";
import type { CountAnswer, CountedSize } from "./answer.ts";
import { certify } from "./certify.ts";
import { EvidenceWriter } from "./evidence-writer.ts";
import { jointSignature } from "./finite-search.ts";
import { SHOWN_MODELS } from "./models.ts";
import { meterFor, type Work } from "./work.ts";

/**
 * Counts size by size; the counts of finished sizes are exact, and where the budget ends nothing more is said.
 * @param representatives whether one model of each class is to be kept
 * @param from the first size
 */
export function countModels(theory: Theory, representatives: boolean, work: Work, from = 1): CountAnswer {
  const writer = new EvidenceWriter();
  const sentences = sentencesOf(theory);
  const axioms = writer.theory(sentences);
  const { relations } = jointSignature([theory]);
  const meter = meterFor(work);
  const sizes: CountedSize[] = [];
  let ended: CountAnswer["ended"] = null;
  let endedAt: number | null = null;
  for (let size = from; size <= work.upTo && ended === null; size += 1) {
    work.report(`counting on ${size} ${size === 1 ? "point" : "points"}`);
    const task = { size, sentences, relations };
    const counted = countStructures(task, meter, { representatives: representatives ? SHOWN_MODELS : 0 });
    ended = counted.ended;
    const { labelled, unlabelled } = counted;
    if (labelled !== null || unlabelled !== null)
      sizes.push({ size, labelled, unlabelled, representatives: counted.representatives });
    if (ended !== null) endedAt = size;
  }
  const shown = sizes.flatMap((counted) => counted.representatives);
  for (const structure of shown) writer.addStructure(structure, sentences, null);
  return {
    question: "count",
    verdict: null,
    steps: meter.steps,
    evidence: shown.length > 0 ? certify(writer.finish({ ask: "models", axioms }, null), work) : null,
    sizes,
    ended,
    endedAt,
  };
}
