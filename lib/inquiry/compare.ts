/** `compare T, U, …`: the order of strength of theories. */

import { sentencesOf, type Theory } from "../logic/theory.ts";
import type { CompareAnswer, PairAnswer } from "./answer.ts";
import { certify } from "./certify.ts";
import { EvidenceWriter } from "./evidence-writer.ts";
import { jointSignature } from "./finite-search.ts";
import { Separator } from "./separate.ts";
import type { Work } from "./work.ts";

/** Three searches for each pair: a model of the left alone, of the right alone, and of both. */
const SEARCHES_A_PAIR = 3;

/** @param theories at least two, with the names they are to be called by */
export function compareTheories(
  theories: readonly { readonly name: string; readonly theory: Theory }[],
  work: Work,
): CompareAnswer {
  const writer = new EvidenceWriter();
  const records = theories.map(({ theory }) => writer.theory(sentencesOf(theory)));
  const signature = jointSignature(theories.map(({ theory }) => theory));
  const separator = new Separator(signature, writer, work);
  const count = (theories.length * (theories.length - 1)) / 2;
  const budget = Math.max(1, Math.floor(work.budget / (count * SEARCHES_A_PAIR)));
  const pairs: PairAnswer[] = [];
  for (const [left, { theory: first }] of theories.entries())
    for (const [right, { theory: second }] of theories.entries()) {
      if (right <= left) continue;
      const leftOnly = separator.separate(first, second, budget);
      const rightOnly = separator.separate(second, first, budget);
      const common = separator.common(first, second, budget);
      pairs.push({
        left,
        right,
        verdict: leftOnly !== null && rightOnly !== null ? "incomparable" : "open",
        leftOnly,
        rightOnly,
        common,
        jointlyInconsistent: common === null ? null : false,
      });
    }
  const verdicts = pairs.map((pair) => pair.verdict);
  const anything = pairs.some((pair) => pair.leftOnly ?? pair.rightOnly ?? pair.common);
  return {
    question: "compare",
    verdict: pairs.length === 1 ? pairs[0]!.verdict : null,
    steps: separator.steps,
    evidence: anything ? certify(writer.finish({ ask: "compare", theories: records }, verdicts), work) : null,
    names: theories.map(({ name }) => name),
    pairs,
    classes: theories.map(({ name }) => [name]),
    interrupted: separator.interrupted,
  };
}
