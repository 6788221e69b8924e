/**
 * Reasons why there is no finite model, at length: converses and complements of the collected sets, the same said in other
 * signatures, and sets with finite models given time.
 */
import { describe, expect, it } from "vitest";
import { usesIdentity } from "../lib/logic/formula.ts";
import { complementFormula, complementTheory, converseFormula } from "../lib/logic/theory.ts";
import { theoryOf } from "./support/corpora.ts";
import {
  expectAccepted,
  findReason,
  refutable,
  variants,
  withoutFinite,
  withoutIdentity,
} from "./support/finiteness-sets.ts";

describe("converses and complements of infinite-only.json", () => {
  it.each(withoutFinite.map(({ id, axioms }) => [id, axioms] as const))("%s", (_, axioms) => {
    const complement = complementTheory(theoryOf(axioms)).axioms.map(({ formula }) => formula);
    for (const set of [axioms.map(converseFormula), complement, complement.map(converseFormula)]) {
      const found = findReason(set, 60_000);
      expect(found).not.toBeNull();
      expectAccepted(set, found!);
    }
    expect(complement).toHaveLength(axioms.map(complementFormula).length);
  });
});

/** Sets that are not found within the steps below, by variant: they are not wrong, and fewer would be better. */
const OPEN: Readonly<Record<string, readonly string[]>> = {
  "with axioms about other relations": ["io-51", "io-67"],
  "for the elements of a part alone": ["io-49", "io-51", "io-55", "io-67"],
  "with an element at a third place": ["io-51", "io-67", "io-71"],
  "for all elements at a third place": ["io-51", "io-67", "io-75"],
  "of a defined relation": [],
};

describe("infinite-only.json, said in another signature", () => {
  it.each(Object.entries(variants))("%s", (name, change) => {
    for (const { id, axioms } of withoutFinite) {
      if (OPEN[name]!.includes(id)) continue;
      const set = change(axioms);
      const found = findReason(set, 60_000);
      expect(found, id).not.toBeNull();
      expectAccepted(set, found!);
    }
  });

  it("without identity: most of those that use it", () => {
    const sets = withoutFinite.filter(({ axioms }) => axioms.some(usesIdentity));
    const found = sets.filter(({ axioms }) => {
      const set = withoutIdentity(axioms);
      const reason = findReason(set, 60_000);
      if (reason !== null) expectAccepted(set, reason);
      return reason !== null;
    });
    expect(sets.length).toBe(26);
    expect(found.length).toBeGreaterThanOrEqual(21);
  });
});

describe("premises and negated conclusion where there is a finite countermodel, with more steps", () => {
  it.each(refutable("fails").map(({ id, axioms }) => [id, axioms] as const))("%s", (_, axioms) => {
    expect(findReason(axioms, 6_000)).toBeNull();
  });
});
