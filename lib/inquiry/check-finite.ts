/** `check-finite T`: has the theory finite models, none, or only infinite ones? */
import { Meter } from "../logic/meter.ts";
import { sentencesOf, type Theory } from "../logic/theory.ts";
import type { FiniteAnswer, FiniteVerdict } from "./answer.ts";
import { certify } from "./certify.ts";
import { EvidenceWriter } from "./evidence-writer.ts";
import { jointSignature } from "./finite-search.ts";
import { proveNoModel } from "./no-model.ts";
import { recordQuestion } from "./question-record.ts";
import { type Settled, Settler } from "./settle.ts";
import type { Work } from "./work.ts";

/** The clause proof for one size may cost one part of so many of the budget. */
const PROOF_SHARE = 8;

/**
 * `finite` with a model, a smallest one where smaller sizes are settled; `inconsistent` with a derivation; `infinite-only`
 * with an infinite model and a derived reason why there is no finite one; `consistent` with the model alone,
 * `no-finite-model` with the reason alone; `open` with the sizes that have no model.
 */
export function checkFinite(theory: Theory, work: Work): FiniteAnswer {
  const writer = new EvidenceWriter();
  const question = recordQuestion({ ask: "check-finite", theory }, writer);
  const settler = new Settler(jointSignature([theory]), writer, work);
  const settled = settler.settle(
    { premises: theory.axioms, conclusions: [], from: "", sought: "a model", finite: true },
    settler.left,
  );
  const { search, report } = settled;
  const verdict = verdictOf(settled);
  let { steps } = settler;
  let provenUpTo = 0;
  while (verdict === "finite" && provenUpTo < search.noneUpTo && steps < work.budget) {
    const meter = new Meter(Math.min(work.budget - steps, work.budget / PROOF_SHARE), work.isInterrupted);
    work.report(`proving that there is no model on ${provenUpTo + 1} points`);
    const proof = proveNoModel(sentencesOf(theory), provenUpTo + 1, meter);
    steps += meter.steps;
    if (proof === null) break;
    provenUpTo += 1;
    writer.addNoModel(sentencesOf(theory), provenUpTo, proof);
  }
  return {
    question: "check-finite",
    verdict,
    steps,
    evidence: verdict === "open" ? null : certify(writer.finish(question, verdict), work),
    leastSize: search.foundAt !== null && search.foundAt === search.noneUpTo + 1 ? search.foundAt : null,
    modelSize: search.foundAt,
    noModelUpTo: search.noneUpTo,
    provenUpTo,
    model: settled.structure ?? settled.infinite,
    noFinite: settled.noFinite,
    search,
    derivation: settled.derivations[0] ?? null,
    report,
  };
}

function verdictOf({ outcome, infinite, noFinite }: Settled): FiniteVerdict {
  if (outcome !== "open") return outcome === "refuted" ? "finite" : "inconsistent";
  if (infinite !== null) return noFinite !== null ? "infinite-only" : "consistent";
  return noFinite !== null ? "no-finite-model" : "open";
}
