/**
 * Evaluation, grounding and search against truth by definition, on all relations on up to 3 points. The published
 * numbers of relations are OEIS A002416 (labelled) and A000595 (up to isomorphism).
 */
import fc from "fast-check";
import { describe, expect, it } from "vitest";
import { Points } from "../lib/carriers/points.ts";
import type { Structure } from "../lib/carriers/structure.ts";
import { recordStructure } from "../lib/carriers/structure-record.ts";
import { isTrueIn } from "../lib/evidence/evaluate.ts";
import { type Formula, not, type RelationSymbol, relationsOf } from "../lib/logic/formula.ts";
import { Meter } from "../lib/logic/meter.ts";
import { recordFormula } from "../lib/logic/records/formulas.ts";
import { satisfies } from "../lib/structures/evaluate.ts";
import { canonicalForm } from "../lib/structures/isomorphism.ts";
import { enumerateStructures, findStructure } from "../lib/structures/search.ts";
import { allInterpretations, type Interpretation, isTrue } from "./support/brute-force.ts";
import { sentences } from "./support/random-formulas.ts";

const R: RelationSymbol = { name: "R", places: 2, infix: false };
const P: RelationSymbol = { name: "P", places: 1, infix: false };
const B: RelationSymbol = { name: "Between", places: 3, infix: false };

const seed = Number(process.env.TWOPLACE_SEED ?? 20261201);
const options = (numRuns: number) => ({ seed, numRuns, verbose: 1 as const });

function structureOf(size: number, relations: readonly RelationSymbol[], given: Interpretation): Structure {
  const carrier = new Points(size);
  const tables = new Map(
    relations.map((relation) => {
      const holds = new Uint8Array(carrier.kindCount(relation.places));
      for (const tuple of given.get(relation.name)!)
        holds[carrier.kindOfTuple(tuple.split(",").map((point) => Number(point) + 1))] = 1;
      return [relation.name, { relation, holds }] as const;
    }),
  );
  return { carrier, tables };
}

/** Every structure over the relations on the size, with its meaning by definition. */
function everyStructure(size: number, relations: readonly RelationSymbol[]) {
  return [...allInterpretations(size, relations)].map((given) => ({
    given,
    structure: structureOf(size, relations, given),
  }));
}

function checkEverywhere(sentence: Formula, sizes: readonly number[], relations: readonly RelationSymbol[]) {
  const meter = new Meter(1e9);
  for (const size of sizes) {
    const all = everyStructure(size, relations);
    const models = all.filter(({ given }) => isTrue(sentence, size, given));
    for (const { given, structure } of all) {
      const expected = isTrue(sentence, size, given);
      expect(satisfies(structure, sentence, meter)).toBe(expected);
      expect(isTrueIn(recordStructure(structure), recordFormula(sentence), meter)).toBe(expected);
    }
    const task = { carrier: new Points(size), sentences: [sentence], relations };
    const found = findStructure(task, meter);
    expect(found.result).toBe(models.length > 0 ? "found" : "none");
    if (found.result === "found") expect(satisfies(found.structure, sentence, meter)).toBe(true);
    const refuted = findStructure({ ...task, sentences: [not(sentence)] }, meter);
    expect(refuted.result).toBe(models.length < all.length ? "found" : "none");
    // Symmetry breaking may drop isomorphic copies, never a whole class.
    const classes = new Set(models.map(({ structure }) => canonicalForm(structure)));
    const listed = new Set<string>();
    const end = enumerateStructures(task, meter, (structure) => {
      expect(satisfies(structure, sentence, meter)).toBe(true);
      listed.add(canonicalForm(structure));
      return true;
    });
    expect(end).toBe("complete");
    expect([...listed].sort()).toEqual([...classes].sort());
  }
}

describe(`random sentences (seed ${seed})`, () => {
  it("over one two-place relation, on 1 and 2 points", () => {
    fc.assert(
      fc.property(sentences([R], 3), (sentence) => checkEverywhere(sentence, [1, 2], [R])),
      options(150),
    );
  });

  it("over one two-place relation, on 3 points", () => {
    fc.assert(
      fc.property(sentences([R], 3), (sentence) => checkEverywhere(sentence, [3], [R])),
      options(15),
    );
  });

  it("over several relations of 1, 2 and 3 places, on 1 and 2 points", () => {
    fc.assert(
      fc.property(sentences([R, P, B], 3), (sentence) => {
        const relations = relationsOf(sentence);
        fc.pre(relations.length > 0);
        checkEverywhere(sentence, relations.includes(B) ? [1] : [1, 2], relations);
      }),
      options(100),
    );
  });
});

describe("all relations", () => {
  it.each([
    [1, 2, 2],
    [2, 16, 10],
    [3, 512, 104],
  ])(
    "on %i points: %i labelled (OEIS A002416), %i up to isomorphism (OEIS A000595)",
    (size, labelled, classes) => {
      const all = everyStructure(size, [R]);
      expect(all.length).toBe(labelled);
      expect(new Set(all.map(({ structure }) => canonicalForm(structure))).size).toBe(classes);
      const task = { carrier: new Points(size), sentences: [], relations: [R] };
      const forms = new Set<string>();
      enumerateStructures(
        task,
        new Meter(),
        (structure) => forms.add(canonicalForm(structure)) !== undefined,
      );
      expect(forms.size).toBe(classes);
    },
  );
});
