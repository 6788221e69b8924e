/** Checking that there is no finite model, by a principle about finite sets. */

import { obligationsOf } from "../logic/records/finiteness.ts";
import type { Evidence, NoFiniteModelFact } from "./format.ts";
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
): void {
  const obligations = obligationsOf(fact.principle) ?? reject(`${at}: the principle is not of its form`);
  const axioms = new Set(fact.axioms);
  const shown = new Set(fact.axioms.map((axiom) => JSON.stringify(sentences[axiom])));
  for (const other of facts)
    if (
      other.fact === "derivation" &&
      other.conclusion !== null &&
      other.premises.every((one) => axioms.has(one))
    )
      shown.add(JSON.stringify(sentences[other.conclusion]));
  for (const [place, obligation] of obligations.entries())
    if (!shown.has(JSON.stringify(obligation))) reject(`${at}: what it asks for at ${place} is not derived`);
}
