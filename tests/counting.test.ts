/**
 * Counts of models: against published numbers on up to 4 points (OEIS; the sequence is in each test's name), against
 * counting by definition, against orderly generation; and how a count ends.
 */
import fc from "fast-check";
import { describe, expect, it } from "vitest";
import type { Formula, RelationSymbol } from "../lib/logic/formula.ts";
import { Meter, WorkEnded } from "../lib/logic/meter.ts";
import { ClauseList, countAssignments } from "../lib/structures/components.ts";
import { countLabelled, countStructures } from "../lib/structures/count.ts";
import { satisfiesAll } from "../lib/structures/evaluate.ts";
import { FormSet } from "../lib/structures/forms.ts";
import { areIsomorphic } from "../lib/structures/isomorphism.ts";
import { allInterpretations, type Interpretation, isTrue } from "./support/brute-force.ts";
import { readSentences } from "./support/corpora.ts";
import { publishedCounts } from "./support/counting.ts";
import { countOrderly, isUniversal } from "./support/orderly.ts";
import { sentences } from "./support/random-formulas.ts";

const R: RelationSymbol = { name: "R", places: 2, infix: false };
const S: RelationSymbol = { name: "S", places: 2, infix: false };
const P: RelationSymbol = { name: "P", places: 1, infix: false };
const B: RelationSymbol = { name: "Between", places: 3, infix: false };

const seed = Number(process.env.TWOPLACE_SEED ?? 20261201);
const options = (numRuns: number) => ({ seed, numRuns, verbose: 1 as const });

const plenty = () => new Meter(1e7);

describe("published numbers on up to 4 points", () => {
  it.each(publishedCounts.map((entry) => [entry.name, entry.source, entry] as const))(
    "%s: %s",
    (_, __, entry) => {
      for (let size = 1; size <= 4; size += 1) {
        const task = { size, sentences: entry.sentences, relations: [R] };
        const counted = countStructures(task, plenty());
        expect(counted.ended).toBeNull();
        if (entry.labelled.has(size)) expect(counted.labelled).toBe(entry.labelled.get(size));
        if (entry.unlabelled.has(size)) expect(counted.unlabelled).toBe(entry.unlabelled.get(size));
        expect(countLabelled(task, plenty())).toEqual({ labelled: counted.labelled, ended: null });
      }
    },
  );

  it("has both numbers of at least 40 sorts of relation", () =>
    expect(publishedCounts.length).toBeGreaterThan(40));
});

describe("orderly generation (Read 1978; Faradžev 1978)", () => {
  const universal = publishedCounts.filter((entry) => entry.sentences.every(isUniversal));
  it("is for universal sentences, of which there are many", () => {
    expect(universal.length).toBeGreaterThan(20);
    expect(() => countOrderly(readSentences(["forall x. exists y. R(x,y)"]), 2)).toThrow("universal");
  });
  it.each(universal.map((entry) => [entry.name, entry] as const))(
    "agrees on up to 4 points: %s",
    (_, entry) => {
      countOrderly(entry.sentences, 4).forEach(({ labelled, unlabelled }, index) => {
        const task = { size: index + 1, sentences: entry.sentences, relations: [R] };
        expect(countStructures(task, plenty())).toMatchObject({ labelled, unlabelled: BigInt(unlabelled) });
      });
    },
  );
});

function permutations(size: number): number[][] {
  if (size === 0) return [[]];
  return permutations(size - 1).flatMap((rest) =>
    Array.from({ length: size }, (_, at) => [...rest.slice(0, at), size - 1, ...rest.slice(at)]),
  );
}

/** A name that isomorphic interpretations share: the least of those of all their renamings. */
function leastName(given: Interpretation, size: number): string {
  const names = permutations(size).map((to) =>
    [...given.values()]
      .map((tuples) =>
        [...tuples]
          .map((tuple) =>
            tuple
              .split(",")
              .map((point) => to[Number(point)])
              .join(),
          )
          .sort()
          .join(" "),
      )
      .join("; "),
  );
  return names.sort()[0]!;
}

describe(`random sentences, by definition (seed ${seed})`, () => {
  const check = (sentence: Formula, size: number, relations: readonly RelationSymbol[]) => {
    const models = [...allInterpretations(size, relations)].filter((given) => isTrue(sentence, size, given));
    const task = { size, sentences: [sentence], relations };
    const labelled = BigInt(models.length);
    const classes = new Set(models.map((given) => leastName(given, size))).size;
    const counted = countStructures(task, plenty(), { representatives: 1000 });
    expect(counted).toMatchObject({
      labelled,
      unlabelled: BigInt(classes),
      classesFound: classes,
      ended: null,
    });
    expect(counted.representatives.length).toBe(classes);
    for (const model of counted.representatives) expect(satisfiesAll(model, [sentence], plenty())).toBe(true);
    expect(countLabelled(task, plenty()).labelled).toBe(labelled);
  };

  it("one two-place relation on 3 points", () => {
    fc.assert(
      fc.property(sentences([R], 3), (sentence) => check(sentence, 3, [R])),
      options(40),
    );
  });
  it("relations of one and two places, two of two places, one of three, on 1 and 2 points", () => {
    const some = fc.constantFrom([P, R], [R, S], [B], [B, P]);
    fc.assert(
      fc.property(
        some.chain((relations) => fc.tuple(fc.constant(relations), sentences(relations, 3))),
        fc.integer({ min: 1, max: 2 }),
        ([relations, sentence], size) => check(sentence, size, relations),
      ),
      options(150),
    );
  });
});

describe(`assignments by independent parts (seed ${seed})`, () => {
  it("are as many as going through all of them says", () => {
    const literal = fc
      .tuple(fc.integer({ min: 1, max: 9 }), fc.boolean())
      .map(([v, sign]) => (sign ? v : -v));
    const clauses = fc.array(fc.array(literal, { minLength: 1, maxLength: 3 }), { maxLength: 9 });
    const over = fc.uniqueArray(fc.integer({ min: 1, max: 9 }));
    fc.assert(
      fc.property(clauses, over, (given, wanted) => {
        const list = new ClauseList(plenty());
        for (let variable = 1; variable <= 9; variable += 1) list.newVariable();
        for (const clause of given) list.addClause(clause);
        const seen = new Set<number>();
        for (let bits = 0; bits < 512; bits += 1) {
          const isTrueLiteral = (l: number) => ((bits >> (Math.abs(l) - 1)) & 1) === (l > 0 ? 1 : 0);
          if (given.every((clause) => clause.some(isTrueLiteral)))
            seen.add(wanted.reduce((mask, variable) => mask | (bits & (1 << (variable - 1))), 0));
        }
        expect(countAssignments(list, wanted, plenty())).toBe(BigInt(seen.size));
      }),
      options(500),
    );
  });
});

const order = readSentences(["forall x. ~R(x,x)", "forall x y z. R(x,y) & R(y,z) -> R(x,z)"]);
const reflexive = readSentences(["forall x. R(x,x)"]);

describe("representatives", () => {
  it("are models, no two isomorphic, as many as classes, or as were asked for", () => {
    const task = { size: 5, sentences: order, relations: [R] };
    // 63 partial orders on 5 points up to isomorphism: OEIS A000112.
    const { representatives } = countStructures(task, plenty(), { representatives: 100 });
    expect(representatives.length).toBe(63);
    representatives.forEach((model, index) => {
      expect(satisfiesAll(model, order, plenty())).toBe(true);
      for (const other of representatives.slice(0, index)) expect(areIsomorphic(model, other)).toBe(false);
    });
    const some = countStructures(task, plenty(), { representatives: 10 });
    expect(some.representatives).toEqual(representatives.slice(0, 10));
    expect(some.unlabelled).toBe(63n);
    expect(countStructures(task, plenty()).representatives).toEqual([]);
  });
});

describe("how a count ends", () => {
  it("with a contradiction there is nothing to count", () => {
    const task = { size: 3, sentences: readSentences(["exists x. R(x,x) & ~R(x,x)"]), relations: [R] };
    expect(countStructures(task, plenty())).toMatchObject({ labelled: 0n, unlabelled: 0n, ended: null });
    expect(countLabelled(task, plenty()).labelled).toBe(0n);
  });

  it("with the budget, and what was finished is said", () => {
    // Reflexive relations: each other entry is free, 2^30 on 6 points (OEIS A053763), in 1,540,944 classes (A000273).
    const counted = countStructures({ size: 6, sentences: reflexive, relations: [R] }, new Meter(2000));
    expect(counted).toMatchObject({ labelled: 2n ** 30n, unlabelled: null, ended: "budget" });
    expect(counted.classesFound).toBeGreaterThan(0);
    expect(counted.classesFound).toBeLessThan(1_540_944);
    // Partial orders do not fall into parts: neither number within so little.
    const neither = countStructures({ size: 7, sentences: order, relations: [R] }, new Meter(50));
    expect(neither).toMatchObject({ labelled: null, unlabelled: null, ended: "budget" });
    const large = countStructures({ size: 60, sentences: order, relations: [R] }, new Meter(50));
    expect(large).toMatchObject({ labelled: null, unlabelled: null, ended: "budget" });
  });

  it("with exact numbers beyond 2^53", () => {
    const task = { size: 9, sentences: [], relations: [R] };
    expect(countLabelled(task, new Meter(1000)).labelled).toBe(2n ** 81n);
  });

  it("with memory, when there are too many forms to keep", () => {
    const forms = new FormSet(2, 2000);
    const meter = plenty();
    expect(() => {
      for (let form = 0; form < 1000; form += 1) forms.add(Uint8Array.of(form >> 8, form & 255), meter);
    }).toThrow(WorkEnded);
    expect(meter.ended).toBe("memory");
    expect(forms.size).toBeGreaterThan(50);
    // Tables that are too large are not begun.
    const wide: RelationSymbol = { name: "W", places: 9, infix: false };
    const counted = countStructures({ size: 9, sentences: [], relations: [wide] }, plenty());
    expect(counted).toMatchObject({ labelled: null, unlabelled: null, ended: "memory" });
  });

  it("when asked to, at once, also in the share that is kept back", () => {
    for (const limit of [0, 3, 30]) {
      let asked = 0;
      const meter = new Meter(1e7, () => asked++ >= limit);
      const counted = countStructures({ size: 7, sentences: order, relations: [R] }, meter);
      expect(counted).toMatchObject({ labelled: null, unlabelled: null, ended: "interrupted" });
      expect(asked).toBeLessThan(limit + 5);
    }
  });

  it("at the same step every time", () => {
    const run = () => {
      const meter = plenty();
      const counted = countStructures({ size: 5, sentences: order, relations: [R] }, meter, {
        representatives: 9,
      });
      return [
        meter.steps,
        counted.representatives.map((model) => [...model.tables.get("R")!.holds].join("")),
      ];
    };
    expect(run()).toEqual(run());
  });
});

describe(`the set of forms (seed ${seed})`, () => {
  it("keeps each form once", () => {
    fc.assert(
      fc.property(
        fc.array(fc.uint8Array({ minLength: 3, maxLength: 3, max: 3 }), { maxLength: 200 }),
        (given) => {
          const forms = new FormSet(3);
          const known = new Set<string>();
          for (const form of given) {
            expect(forms.add(form, plenty())).toBe(!known.has(form.join()));
            known.add(form.join());
          }
          expect(forms.size).toBe(known.size);
        },
      ),
      options(200),
    );
  });
});
