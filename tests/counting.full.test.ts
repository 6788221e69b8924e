/**
 * Counts of models on 5 to 7 points against published numbers (OEIS and others; the source is in each test's name), and
 * orderly generation on 5. The longest four, of one to two million classes, are counted with TWOPLACE_LONG=1 only.
 */
import { describe, expect, it } from "vitest";
import { countModels } from "../lib/inquiry/count.ts";
import { unwatchedWork } from "../lib/inquiry/work.ts";
import type { RelationSymbol } from "../lib/logic/formula.ts";
import { Meter } from "../lib/logic/meter.ts";
import { countLabelled, countStructures } from "../lib/structures/count.ts";
import { entryOf, readSentences, readTheory } from "./support/corpora.ts";
import { type PublishedCount, publishedCounts } from "./support/counting.ts";
import { countOrderly, isUniversal } from "./support/orderly.ts";

const R: RelationSymbol = { name: "R", places: 2, infix: false };
const plenty = () => new Meter(1e8);
/** Steps for the labelled number by going through all models, where it is tried as a second way. */
const SECOND_WAY = 100_000;

/** Counts up to this are checked. */
const MOST = 10_000_000n;
/** Classes beyond which a count takes longer than some seconds. */
const MANY_CLASSES = 1_000_000n;

function isWithin(entry: PublishedCount, size: number): boolean {
  return [entry.labelled.get(size), entry.unlabelled.get(size)].some(
    (count) => count !== undefined && count <= MOST,
  );
}

function check(entry: PublishedCount, size: number): void {
  const task = { size, sentences: entry.sentences, relations: [R] };
  const counted = countStructures(task, plenty());
  expect(counted.ended).toBeNull();
  const { labelled, unlabelled } = counted;
  if (entry.labelled.has(size)) expect(labelled).toBe(entry.labelled.get(size));
  if (entry.unlabelled.has(size)) expect(unlabelled).toBe(entry.unlabelled.get(size));
  const second = countLabelled(task, new Meter(SECOND_WAY));
  if (second.ended === null) expect(second.labelled).toBe(labelled);
}

const cases = [5, 6, 7].flatMap((size) =>
  publishedCounts
    .filter((entry) => isWithin(entry, size))
    .map((entry) => ({ size, entry, long: (entry.unlabelled.get(size) ?? 0n) > MANY_CLASSES })),
);

describe("published numbers on 5 to 7 points, wherever one is at most 10,000,000", () => {
  it("are more than a hundred", () => expect(cases.length).toBeGreaterThan(100));
  it.each(
    cases
      .filter(({ long }) => !long)
      .map((each) => [each.entry.name, each.size, each.entry.source, each] as const),
  )("%s on %i points: %s", (_, __, ___, { entry, size }) => check(entry, size));
  it
    .skipIf(process.env.TWOPLACE_LONG === undefined)
    .each(
      cases
        .filter(({ long }) => long)
        .map((each) => [each.entry.name, each.size, each.entry.source, each] as const),
    )("%s on %i points: %s (TWOPLACE_LONG)", { timeout: 600_000 }, (_, __, ___, { entry, size }) =>
    check(entry, size),
  );
});

describe("orderly generation (Read 1978; Faradžev 1978) on 5 points", () => {
  const universal = publishedCounts.filter((entry) => entry.sentences.every(isUniversal));
  it.each(universal.map((entry) => [entry.name, entry] as const))("agrees: %s", (_, entry) => {
    const { labelled, unlabelled } = countOrderly(entry.sentences, 5)[4]!;
    const counted = countStructures({ size: 5, sentences: entry.sentences, relations: [R] }, plenty());
    expect(counted).toMatchObject({ labelled, unlabelled: BigInt(unlabelled), ended: null });
  });
});

describe("sequences that hang together", () => {
  const labelled = (axioms: readonly string[], size: number) =>
    countStructures({ size, sentences: readSentences(axioms), relations: [R] }, plenty()).labelled;

  it("symmetric transitive relations on n points are as many as equivalences on n + 1 (OEIS A000110)", () => {
    const partial = ["forall x y. R(x,y) -> R(y,x)", "forall x y z. R(x,y) & R(y,z) -> R(x,z)"];
    const numbers = entryOf("a-fact-per-bell").expected as number[];
    numbers.forEach((count, index) => {
      expect(labelled(partial, index + 1)).toBe(BigInt(count));
      expect(labelled([...partial, "forall x. R(x,x)"], index + 2)).toBe(BigInt(count));
    });
  });

  it("reflexive transitive relations that are not symmetric (OEIS A395715)", () => {
    const axioms = [
      "forall x. R(x,x)",
      "forall x y z. R(x,y) & R(y,z) -> R(x,z)",
      "exists x y. R(x,y) & ~R(y,x)",
    ];
    const numbers = entryOf("a-fact-preorder-nonequiv").expected as number[];
    numbers.slice(1).forEach((count, index) => {
      expect(labelled(axioms, index + 1)).toBe(BigInt(count));
    });
  });

  it("lattices and bounded orders part at 6 points (OEIS A055512, A006966)", () => {
    const bounded = [
      "forall x. R(x,x)",
      "forall x y. R(x,y) & R(y,x) -> x = y",
      "forall x y z. R(x,y) & R(y,z) -> R(x,z)",
      "exists x. forall y. R(x,y)",
      "exists x. forall y. R(y,x)",
    ];
    const lattice = [
      ...bounded,
      "forall x y. exists z. R(x,z) & R(y,z) & (forall w. R(x,w) & R(y,w) -> R(z,w))",
      "forall x y. exists z. R(z,x) & R(z,y) & (forall w. R(w,x) & R(w,y) -> R(w,z))",
    ];
    const count = (axioms: readonly string[], size: number) =>
      countStructures({ size, sentences: readSentences(axioms), relations: [R] }, plenty());
    for (const size of [1, 2, 3, 4, 5]) {
      const { labelled: all, unlabelled: classes } = count(lattice, size);
      expect(count(bounded, size)).toMatchObject({ labelled: all, unlabelled: classes });
    }
    expect(count(lattice, 6)).toMatchObject({ labelled: 6390n, unlabelled: 15n });
    expect(count(bounded, 6)).toMatchObject({ labelled: 6570n, unlabelled: 16n });
  });

  it("quasigroups as relations of three places: Latin squares (OEIS A002860), their classes (OEIS A057991)", () => {
    const T: RelationSymbol = { name: "T", places: 3, infix: false };
    const sentences = readSentences([
      "forall x y. exists z. T(x,y,z)",
      "forall x y z w. T(x,y,z) & T(x,y,w) -> z = w",
      "forall x y z w. T(x,y,z) & T(x,w,z) -> y = w",
      "forall x y z w. T(x,y,z) & T(w,y,z) -> x = w",
    ]);
    const counts = [1, 2, 3, 4].map((size) => countStructures({ size, sentences, relations: [T] }, plenty()));
    expect(counts.map((count) => count.labelled)).toEqual([1n, 2n, 12n, 576n]);
    expect(counts.map((count) => count.unlabelled)).toEqual([1n, 1n, 5n, 35n]);
  });
});

describe("the question", () => {
  it("counts size by size within the default budget, and says where it ended", () => {
    const theory = readTheory(["forall x. R(x,x)"]);
    const answer = countModels(theory, false, { ...unwatchedWork, upTo: 6 });
    expect(answer.sizes.slice(0, 5).map((each) => each.unlabelled)).toEqual([1n, 3n, 16n, 218n, 9608n]);
    expect(answer.sizes[5]).toMatchObject({ size: 6, labelled: 2n ** 30n, unlabelled: null });
    expect(answer).toMatchObject({ ended: "budget", endedAt: 6 });
  });
});
