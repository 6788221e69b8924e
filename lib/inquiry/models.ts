/** `models T of size n`: the models themselves, one of each class of isomorphic ones. */
import { Points } from "../carriers/points.ts";
import type { Structure } from "../carriers/structure.ts";
import { Meter } from "../logic/meter.ts";
import { sentencesOf, type Theory } from "../logic/theory.ts";
import { canonicalForm } from "../structures/isomorphism.ts";
import { enumerateStructures } from "../structures/search.ts";
import type { ModelsAnswer } from "./answer.ts";
import { certify } from "./certify.ts";
import { EvidenceWriter } from "./evidence-writer.ts";
import { jointSignature } from "./finite-search.ts";
import { proveNoModel } from "./no-model.ts";
import { meterFor, type Work } from "./work.ts";

/** Models that are shown; whether there are more is said. */
export const SHOWN_MODELS = 24;

export function findModels(theory: Theory, size: number, work: Work): ModelsAnswer {
  const writer = new EvidenceWriter();
  const sentences = sentencesOf(theory);
  const axioms = writer.theory(sentences);
  const { relations } = jointSignature([theory]);
  const meter = meterFor(work);
  const models: Structure[] = [];
  const seen = new Set<string>();
  let more = false;
  work.report(`models on ${size} ${size === 1 ? "point" : "points"}`);
  const end = enumerateStructures({ carrier: new Points(size), sentences, relations }, meter, (structure) => {
    const form = canonicalForm(structure, meter);
    if (seen.has(form)) return true;
    seen.add(form);
    if (models.length === SHOWN_MODELS) {
      more = true;
      return false;
    }
    models.push(structure);
    return true;
  });
  for (const model of models) writer.addStructure(model, sentences, null);
  let { steps } = meter;
  let provenNone = false;
  if (end === "complete" && models.length === 0) {
    const proofMeter = new Meter(Math.max(1, work.budget - steps), work.isInterrupted);
    const proof = proveNoModel(sentences, size, proofMeter);
    steps += proofMeter.steps;
    if (proof !== null) writer.addNoModel(sentences, size, proof);
    provenNone = proof !== null;
  }
  return {
    question: "models",
    verdict: null,
    steps,
    evidence: writer.isEmpty ? null : certify(writer.finish({ ask: "models", axioms }, null), work),
    size,
    models,
    complete: end === "complete",
    more,
    provenNone,
    ended: end === "complete" || end === "stopped" ? null : end,
  };
}
