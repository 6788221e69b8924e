/**
 * Boolean algebras at depth 4, where a configuration of three elements has up to 6,561 extensions: against dyadic samples
 * (`support/homogeneous-samples.ts`), and the numbers of kinds of four elements.
 */
import fc from "fast-check";
import { describe, expect, it } from "vitest";
import { recordStructure } from "../lib/carriers/structure-record.ts";
import { isTrueIn } from "../lib/evidence/evaluate.ts";
import type { RelationSymbol } from "../lib/logic/formula.ts";
import { Meter } from "../lib/logic/meter.ts";
import { recordFormula } from "../lib/logic/records/formulas.ts";
import { satisfies } from "../lib/structures/evaluate.ts";
import {
  algebraCases,
  algebraWithoutEnds,
  algebraWithoutZero,
  cases,
  fullAlgebra,
  prenexSentences,
  randomTables,
} from "./support/homogeneous-cases.ts";
import { isTrueByStages, representativesOf } from "./support/homogeneous-samples.ts";

const R: RelationSymbol = { name: "R", places: 2, infix: false };
const B: RelationSymbol = { name: "B", places: 3, infix: false };

const seed = Number(process.env.TWOPLACE_SEED ?? 20261201);
const meter = () => new Meter(1e9);

describe.each(algebraCases)(`$name: random sentences of depth 4 (seed ${seed})`, (which) => {
  it("are true where they are by the sample", () => {
    const sample = which.sampleOf(4);
    const range = representativesOf(sample);
    fc.assert(
      fc.property(prenexSentences([R, B], 4), fc.tuple(fc.nat(), fc.nat()), (sentence, numbers) => {
        const { structure, signatures } = randomTables(which, [R, B], numbers);
        const expected = isTrueByStages(sentence, sample, signatures, range);
        expect(satisfies(structure, sentence, meter())).toBe(expected);
        expect(isTrueIn(recordStructure(structure), recordFormula(sentence), meter())).toBe(expected);
      }),
      { seed, numRuns: 40, verbose: 1 },
    );
  });
});

describe("how many kinds there are of four elements", () => {
  it("in Boolean algebras", () => {
    // All sets of cells but the empty one; covers (OEIS A003465), with the outer cell or with and without it.
    expect(fullAlgebra.carrier.kindCount(4)).toBe(2 ** 16 - 1);
    expect(algebraWithoutEnds.carrier.kindCount(4)).toBe(32297);
    expect(algebraWithoutZero.carrier.kindCount(4)).toBe(2 * 32297);
  });

  it("in generic structures", () => {
    // Over the partitions of four things, of 4, 3, 2 and 1 parts: 1, 6, 7, 1.
    const counts = cases.slice(0, 4).map(({ carrier }) => carrier.kindCount(4));
    expect(counts).toEqual([64 + 6 * 8 + 7 * 2 + 1, 4096 + 6 * 64 + 7 * 4 + 1, 64 + 6 * 8 + 7 * 2 + 1, 355]);
  });
});
