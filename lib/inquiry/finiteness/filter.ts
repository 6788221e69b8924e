/** Testing sentences on a structure before anything is derived. */
import type { Structure } from "../../carriers/structure.ts";
import { depthOf, type Formula } from "../../logic/formula.ts";
import { type Meter, WorkEnded } from "../../logic/meter.ts";
import { MeterShare } from "../../logic/share.ts";
import { satisfies } from "../../structures/evaluate.ts";

/** Steps for one sentence. */
const MOST_STEPS = 20;
/** Sentences for which a configuration may have more extensions than this are not looked at. */
const MOST_EXTENSIONS = 2_000;
/** After so many sentences that were too dear, none as deep is looked at. */
const MOST_IN_VAIN = 3;

/** Remembers which sentences were looked at, and how deep ones are too dear. */
export class Filter {
  readonly #false = new WeakMap<Structure, Map<Formula, boolean>>();
  readonly #inVain = new WeakMap<Structure, Map<number, number>>();

  /** Whether a sentence is found to be false in a structure; that it is too dear to say is no. */
  isFalse(structure: Structure, sentence: Formula, meter: Meter): boolean {
    const known = memoryOf(this.#false, structure);
    let isFalse = known.get(sentence);
    if (isFalse === undefined) {
      isFalse = this.#evaluate(structure, sentence, meter);
      known.set(sentence, isFalse);
    }
    return isFalse;
  }

  #evaluate(structure: Structure, sentence: Formula, meter: Meter): boolean {
    const { carrier } = structure;
    const depth = depthOf(sentence);
    const inVain = memoryOf(this.#inVain, structure);
    if ([...inVain].some(([tried, times]) => tried <= depth && times >= MOST_IN_VAIN)) return false;
    for (let named = 0; named < depth; named += 1)
      if (carrier.mostExtensions(named, depth - named - 1) > MOST_EXTENSIONS) return false;
    const share = new MeterShare(meter, MOST_STEPS);
    try {
      return !satisfies(structure, sentence, share.meter);
    } catch (problem) {
      // That it is too dear may be said only when it could have its whole share.
      if (!(problem instanceof WorkEnded) || share.ended === "interrupted" || share.meter.limit < MOST_STEPS)
        throw problem;
      inVain.set(depth, (inVain.get(depth) ?? 0) + 1);
      return false;
    } finally {
      share.settle();
    }
  }
}

function memoryOf<Key extends WeakKey, Inner, Value>(
  memory: WeakMap<Key, Map<Inner, Value>>,
  key: Key,
): Map<Inner, Value> {
  let known = memory.get(key);
  if (known === undefined) {
    known = new Map();
    memory.set(key, known);
  }
  return known;
}
