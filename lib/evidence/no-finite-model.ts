/** Checking that there is no finite model, by a principle about finite sets. */

import type { Meter } from "../logic/meter.ts";
import { obligationsOf } from "../logic/records/finiteness.ts";
import type { Evidence, FormulaRecord, NoFiniteModelFact } from "./format.ts";
import { reject } from "./read.ts";

/**
 * Checks that all that the principle asks for is among the axioms or derived from them. The derivations are facts of their
 * own and checked as such.
 * @throws Rejected
 */
export function checkNoFiniteModel(
  fact: NoFiniteModelFact,
  { sentences, facts }: Evidence,
  at: string,
  meter: Meter,
): void {
  const obligations = obligationsOf(fact.principle) ?? reject(`${at}: the principle is not of its form`);
  const axioms = new Set(fact.axioms);
  const texts = textsOf(sentences);
  const shown = new Set(fact.axioms.map((axiom) => texts[axiom]!));
  for (const other of facts) {
    if (other.fact !== "derivation" || other.conclusion === null) continue;
    meter.charge(1 + other.premises.length);
    if (other.premises.every((one) => axioms.has(one))) shown.add(texts[other.conclusion]!);
  }
  for (const [place, obligation] of obligations.entries()) {
    const text = JSON.stringify(obligation);
    meter.charge(text.length);
    if (!shown.has(text)) reject(`${at}: what it asks for at ${place} is not derived`);
  }
}

/** Remembered, since every principle asks for it. */
const known = new WeakMap<readonly FormulaRecord[], readonly string[]>();

function textsOf(sentences: readonly FormulaRecord[]): readonly string[] {
  const texts = known.get(sentences) ?? sentences.map((sentence) => JSON.stringify(sentence));
  known.set(sentences, texts);
  return texts;
}
