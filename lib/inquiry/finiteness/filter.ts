/** Testing sentences on structures before anything is derived. */
import type { Structure } from "../../carriers/structure.ts";
import { depthOf, type Formula } from "../../logic/formula.ts";
import { type Meter, WorkEnded } from "../../logic/meter.ts";
import { MeterShare } from "../../logic/share.ts";
import { satisfies } from "../../structures/evaluate.ts";

/** Steps for one sentence. */
const MOST_STEPS = 30;
const MOST_EXTENSIONS = 5_000;

/** Whether a sentence is true in a structure; null when that is too dear to say. */
export function isTrueIn(structure: Structure, sentence: Formula, meter: Meter): boolean | null {
  const depth = depthOf(sentence);
  for (let named = 0; named < depth; named += 1)
    if (structure.carrier.mostExtensions(named, depth - named - 1) > MOST_EXTENSIONS) return null;
  const share = new MeterShare(meter, MOST_STEPS);
  try {
    return satisfies(structure, sentence, share.meter);
  } catch (problem) {
    if (!(problem instanceof WorkEnded)) throw problem;
    if (!share.settle() || share.ended === "interrupted") throw problem;
    return null;
  } finally {
    share.settle();
  }
}
