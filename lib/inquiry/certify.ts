/** No verdict leaves a question before the independent checker has accepted its evidence. */
import { checkEvidence, meterForCheck } from "../evidence/check.ts";
import type { Evidence } from "../evidence/format.ts";
import { WorkEnded } from "../logic/meter.ts";
import type { Work } from "./work.ts";

/**
 * The evidence, once the checker has accepted it.
 * @throws WorkEnded when the user interrupts the check, or it takes far more than the search did
 * @throws Error when the checker rejects it, which is a bug of ours and never shown as a verdict
 */
export function certify(evidence: Evidence, work: Work): Evidence {
  work.report("checking the evidence");
  const meter = meterForCheck(work.budget, work.isInterrupted);
  const result = checkEvidence(evidence, meter);
  if (result.accepted) return evidence;
  if (meter.ended !== null) throw new WorkEnded(meter.ended);
  throw new Error(`the checker rejected evidence for "${evidence.question.ask}": ${result.reason}`);
}
