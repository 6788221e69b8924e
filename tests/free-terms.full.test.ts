/** Free terms: random structures in numbers, and all that is found for the corpora. */
import { describe, expect, it } from "vitest";
import { checkCertificate } from "../lib/carriers/free-terms-check.ts";
import { type RelationSymbol, relationsOf } from "../lib/logic/formula.ts";
import { Meter } from "../lib/logic/meter.ts";
import { recordFormula } from "../lib/logic/records/formulas.ts";
import { findFreeTerms } from "../lib/structures/free-terms/find.ts";
import { claims, questions } from "./support/corpora.ts";
import {
  agreesAtGroundTerms,
  agreesWithParameters,
  certifiesOneSide,
  readsWhatIsWritten,
  seed,
} from "./support/free-terms-properties.ts";
import { passes, takesWitnessesFromHypotheses } from "./support/ground-terms.ts";
import { dualOf, FORMS, infiniteIds, wantedBy } from "./support/wanted-models.ts";

describe(`random structures in numbers (seed ${seed})`, () => {
  it("are read as they are written", () => readsWhatIsWritten(2_000));
  it("unfolding at ground terms agrees with their definition", () => agreesAtGroundTerms(6_000));
  it("unfolding with parameters agrees with all ground terms", () => agreesWithParameters(10_000));
  it("no sentence is certified with its negation, and certified ones are true as far as can be seen", () =>
    certifiesOneSide(800));
});

function relationsIn(sentences: Parameters<typeof findFreeTerms>[0]): readonly RelationSymbol[] {
  return [...new Map(sentences.flatMap(relationsOf).map((one) => [one.name, one])).values()];
}

// tests/data, with the sources there.
describe("the corpora", () => {
  it.each(FORMS)("sets with infinite models only, %s: what is found passes", (form) => {
    let found = 0;
    for (const id of infiniteIds) {
      const sentences = dualOf(wantedBy(id), form);
      const result = findFreeTerms(sentences, relationsIn(sentences), new Meter());
      if (result === null) continue;
      found += 1;
      for (const [place, formula] of sentences.entries()) {
        const sentence = recordFormula(formula);
        const certificate = result.certificates[place]!;
        expect(checkCertificate(result.record, sentence, certificate, new Meter())).toBe(true);
        if (!takesWitnessesFromHypotheses(certificate))
          expect(passes(result.record, sentence, certificate), id).toBe(true);
      }
    }
    expect(found).toBeGreaterThanOrEqual(15);
  });

  // What follows has no countermodel, whatever the search looks for.
  it("no structure against what holds", () => {
    const entries = [...claims, ...questions].filter(({ expected }) => expected === "holds");
    expect(entries.length).toBeGreaterThan(150);
    for (const { id } of entries) {
      const sentences = wantedBy(id);
      expect(findFreeTerms(sentences, relationsIn(sentences), new Meter()), id).toBeNull();
    }
  });
});
