/** `dualise T`: the theory, its converse, its complement and both; which of the four coincide. */

import { complementTheory, converseTheory, sentencesOf, type Theory } from "../logic/theory.ts";
import type { DualAnswer, DualPair } from "./answer.ts";
import { certify } from "./certify.ts";
import { EvidenceWriter } from "./evidence-writer.ts";
import { jointSignature } from "./finite-search.ts";
import { Separator } from "./separate.ts";
import type { Work } from "./work.ts";

/** Six pairs of the four, each in two directions. */
const SEARCHES = 12;

/** The four theories, with names made from that of the first. */
export function dualsOf(
  name: string,
  theory: Theory,
): readonly { readonly name: string; readonly theory: Theory }[] {
  const converse = converseTheory(theory);
  return [
    { name, theory },
    { name: `converse(${name})`, theory: converse },
    { name: `complement(${name})`, theory: complementTheory(theory) },
    { name: `complement(converse(${name}))`, theory: complementTheory(converse) },
  ];
}

export function askDuals(name: string, theory: Theory, work: Work): DualAnswer {
  const writer = new EvidenceWriter();
  const duals = dualsOf(name, theory);
  const records = duals.map((dual) => writer.theory(sentencesOf(dual.theory)));
  const separator = new Separator(jointSignature(duals.map((dual) => dual.theory)), writer, work);
  const budget = Math.max(1, Math.floor(work.budget / SEARCHES));
  const pairs: DualPair[] = [];
  for (const [left, { theory: first }] of duals.entries())
    for (const [right, { theory: second }] of duals.entries()) {
      if (right <= left) continue;
      const leftOnly = separator.separate(first, second, budget);
      if (leftOnly !== null) {
        pairs.push({ left, right, verdict: "different", witness: { structure: leftOnly, modelOf: left } });
        continue;
      }
      const rightOnly = separator.separate(second, first, budget);
      pairs.push(
        rightOnly === null
          ? { left, right, verdict: "open", witness: null }
          : { left, right, verdict: "different", witness: { structure: rightOnly, modelOf: right } },
      );
    }
  const verdicts = pairs.map((pair) => pair.verdict);
  return {
    question: "dualise",
    verdict: null,
    steps: separator.steps,
    evidence: verdicts.includes("different")
      ? certify(writer.finish({ ask: "dualise", theories: records }, verdicts), work)
      : null,
    duals,
    pairs,
    interrupted: separator.interrupted,
  };
}
