/**
 * Generic graphs, digraphs, tournaments, partial orders and atomless Boolean algebras, against samples that are built
 * another way (`support/homogeneous-samples.ts`): what is listed is what is there, and sentences are true where they are
 * true by the sample. Then what is known of these structures; each source stands beside its check, named
 * from memory.
 */
import fc from "fast-check";
import { describe, expect, it } from "vitest";
import { BooleanAlgebra } from "../lib/carriers/boolean-algebra.ts";
import { recordStructure } from "../lib/carriers/structure-record.ts";
import { isTrueIn } from "../lib/evidence/evaluate.ts";
import type { RelationSymbol } from "../lib/logic/formula.ts";
import { Meter } from "../lib/logic/meter.ts";
import { recordFormula } from "../lib/logic/records/formulas.ts";
import { satisfies } from "../lib/structures/evaluate.ts";
import { isTrue } from "./support/brute-force.ts";
import { infiniteOnly, readSentences } from "./support/corpora.ts";
import {
  algebraWithoutEnds,
  algebraWithoutZero,
  type Case,
  cases,
  depthOf,
  fullAlgebra,
  genericCases,
  locate,
  prenexSentences,
  randomTables,
  tablesFor,
} from "./support/homogeneous-cases.ts";
import { isTrueByStages, orderSample, tuplesOf } from "./support/homogeneous-samples.ts";
import { sentences } from "./support/random-formulas.ts";

const R: RelationSymbol = { name: "R", places: 2, infix: false };
const P: RelationSymbol = { name: "P", places: 1, infix: false };
const B: RelationSymbol = { name: "B", places: 3, infix: false };

const seed = Number(process.env.TWOPLACE_SEED ?? 20261201);
const options = (numRuns: number) => ({ seed, numRuns, verbose: 1 as const });
const meter = () => new Meter(1e9);

function caseOf(name: string): Case {
  return cases.find((which) => which.name === name)!;
}

describe.each(cases)("$name: what is listed", (which) => {
  const { carrier, signatureOf } = which;
  const sample = which.sampleOf(3);

  it("is just what the sample has, each once", () => {
    for (let length = 0; length < 3; length += 1)
      for (const tuple of tuplesOf(sample, length)) {
        const listed = carrier.extensions(locate(which, sample, tuple), 0).map(signatureOf);
        const real = new Set(sample.stages[length]!.map((element) => sample.signature([...tuple, element])));
        expect(new Set(listed)).toEqual(real);
        expect(listed.length).toBe(real.size);
        expect(listed.length).toBeLessThanOrEqual(carrier.mostExtensions(length, 0));
      }
  });

  it("has the identities, parts and kinds of the sample", () => {
    const tuples = tuplesOf(sample, 3);
    const chosen = fc.tuple(
      fc.nat(tuples.length - 1),
      fc.array(fc.nat(2), { maxLength: 4 }),
      fc.nat(tuples.length - 1),
    );
    fc.assert(
      fc.property(chosen, ([index, places, other]) => {
        const [tuple, second] = [tuples[index]!, tuples[other]!];
        const configuration = locate(which, sample, tuple);
        for (const i of [0, 1, 2])
          for (const j of [0, 1, 2]) expect(carrier.same(configuration, i, j)).toBe(tuple[i] === tuple[j]);
        const part = places.map((place) => tuple[place]!);
        const restricted = carrier.restrict(configuration, places);
        expect(signatureOf(restricted)).toBe(sample.signature(part));
        const kind = carrier.kindOf(configuration, places);
        const own = places.map((_, place) => place);
        expect(carrier.kindOf(restricted, own)).toBe(kind);
        expect(kind).toBeLessThan(carrier.kindCount(places.length));
        // Another tuple has the same kind, and the same key, exactly if it has the same signature.
        const isAlike = sample.signature(places.map((place) => second[place]!)) === sample.signature(part);
        const otherConfiguration = locate(which, sample, second);
        expect(carrier.kindOf(otherConfiguration, places) === kind).toBe(isAlike);
        expect(
          carrier.key(carrier.restrict(otherConfiguration, places), 1) === carrier.key(restricted, 1),
        ).toBe(isAlike);
      }),
      options(250),
    );
  });

  it("has a key of its own for each configuration, of any length", () => {
    const keys = new Set<string | number>();
    let configurations = 0;
    for (let length = 0; length <= 3; length += 1)
      for (const example of carrier.kindExamples(length)) {
        keys.add(carrier.key(example, 1));
        configurations += 1;
      }
    expect(keys.size).toBe(configurations);
  });

  it("has symmetries that exchange kinds and keep what is true", () => {
    for (const symmetry of carrier.symmetries())
      for (const length of [1, 2, 3])
        for (let kind = 0; kind < carrier.kindCount(length); kind += 1) {
          expect(symmetry.image(length, symmetry.image(length, kind))).toBe(kind);
        }
    fc.assert(
      fc.property(prenexSentences([R, P], 3), fc.tuple(fc.nat(), fc.nat()), (sentence, numbers) => {
        const { structure } = randomTables(which, [R, P], numbers);
        const expected = satisfies(structure, sentence, meter());
        for (const symmetry of carrier.symmetries()) {
          const image = tablesFor(which, [R, P], ({ name, places }, kind) => {
            return structure.tables.get(name)!.holds[symmetry.image(places, kind)] === 1;
          });
          expect(satisfies(image.structure, sentence, meter())).toBe(expected);
        }
      }),
      options(60),
    );
  });
});

describe.each(cases)(`$name: random sentences (seed ${seed})`, (which) => {
  const sample = which.sampleOf(3);

  it.each([
    ["quantifiers in front", prenexSentences([R, P, B], 3), 120],
    ["quantifiers anywhere", sentences([R, P], 2).filter((sentence) => depthOf(sentence) <= 3), 120],
  ] as const)("%s, depth up to 3", (_, arbitrary, runs) => {
    let holding = 0;
    fc.assert(
      fc.property(arbitrary, fc.tuple(fc.nat(), fc.nat(), fc.nat()), (sentence, numbers) => {
        const { structure, signatures } = randomTables(which, [R, P, B], numbers);
        const expected = isTrueByStages(sentence, sample, signatures);
        if (expected) holding += 1;
        expect(satisfies(structure, sentence, meter())).toBe(expected);
        expect(isTrueIn(recordStructure(structure), recordFormula(sentence), meter())).toBe(expected);
      }),
      options(runs),
    );
    // Neither all nor none of them are true, or the comparison would say little.
    expect(holding).toBeGreaterThan(runs / 10);
    expect(holding).toBeLessThan((runs * 9) / 10);
  });
});

describe(`random sentences of depth 4 (seed ${seed})`, () => {
  it.each(cases.filter(({ mostStages }) => mostStages >= 4))("$name", (which) => {
    const sample = which.sampleOf(4);
    fc.assert(
      fc.property(prenexSentences([R], 4), fc.tuple(fc.nat()), (sentence, numbers) => {
        const { structure, signatures } = randomTables(which, [R], numbers);
        expect(satisfies(structure, sentence, meter())).toBe(isTrueByStages(sentence, sample, signatures));
      }),
      options(60),
    );
  });
});

/**
 * On q points, an arc from x to y when y − x is a square modulo q. A finite graph or tournament in which every two points
 * can be extended in every way satisfies the same sentences of depth 3 as the generic one. In the Paley graph they can when
 * q > 16 (Blass, Exoo and Harary 1981); for tournaments the same sums of characters say so (Graham and Spencer 1971).
 * It is looked at here as well.
 */
describe.each([
  { name: "graph", q: 29 },
  { name: "tournament", q: 23 },
])("the generic $name and that of Paley on $q points", ({ name, q }) => {
  const which = caseOf(name);
  const points = Array.from({ length: q }, (_, point) => point);
  const squares = new Set(points.slice(1).map((point) => (point * point) % q));
  const hasArc = (x: number, y: number) => squares.has((y - x + q) % q);

  it("extends every two points in every way", () => {
    for (const x of points)
      for (const y of points.slice(0, x))
        for (const [toX, toY] of [
          [false, false],
          [false, true],
          [true, false],
          [true, true],
        ] as const)
          expect(points.some((z) => z !== x && z !== y && hasArc(z, x) === toX && hasArc(z, y) === toY)).toBe(
            true,
          );
  });

  it("satisfy the same sentences", () => {
    fc.assert(
      fc.property(prenexSentences([R], 3), fc.nat(), (sentence, number) => {
        const { structure, signatures } = randomTables(which, [R], [number]);
        const pairs = new Set<string>();
        for (const x of points)
          for (const y of points) {
            const code = x === y ? "=" : Number(hasArc(x, y)) + 2 * Number(hasArc(y, x));
            if (signatures.get("R")!.has(`2:${code}`)) pairs.add(`${x},${y}`);
          }
        expect(satisfies(structure, sentence, meter())).toBe(isTrue(sentence, q, new Map([["R", pairs]])));
      }),
      options(60),
    );
  });
});

describe("the sample of the generic partial order", () => {
  it("is a strict order", () => {
    const { less } = orderSample(3);
    for (const [element, greater] of less.entries()) {
      expect(greater.has(element)).toBe(false);
      for (const next of greater) for (const last of less[next]!) expect(greater.has(last)).toBe(true);
    }
  });
});

/** Stirling numbers of the second kind: ways to part so many things into so many classes. */
function classes(things: number, parts: number): number {
  if (things === 0 || parts === 0) return things === parts ? 1 : 0;
  return parts * classes(things - 1, parts) + classes(things - 1, parts - 1);
}
/** Sums over the number of classes of equal elements. */
function overClasses(length: number, kinds: (parts: number) => number): number {
  let sum = 0;
  for (let parts = 0; parts <= length; parts += 1) sum += classes(length, parts) * kinds(parts);
  return sum;
}
const pairs = (n: number) => (n * (n - 1)) / 2;

describe("how many kinds there are", () => {
  const counts = (which: Case) => [1, 2, 3].map((length) => which.carrier.kindCount(length));

  it("of tuples of generic structures", () => {
    const expected = (kinds: (parts: number) => number) =>
      [1, 2, 3].map((length) => overClasses(length, kinds));
    // Labelled graphs, digraphs without loops, tournaments: 2, 4 and 2 to the number of pairs (OEIS A006125, A053763, A006125).
    expect(counts(caseOf("graph"))).toEqual(expected((n) => 2 ** pairs(n)));
    expect(counts(caseOf("digraph"))).toEqual(expected((n) => 4 ** pairs(n)));
    expect(counts(caseOf("tournament"))).toEqual(expected((n) => 2 ** pairs(n)));
    expect(genericCases.map((which) => which.carrier.kindCount(2))).toEqual([3, 5, 3, 4]);
    // Orders in which some elements are the same are preorders (OEIS A000798: 1, 1, 4, 29, 355).
    expect(counts(caseOf("partial-order"))).toEqual([1, 4, 29]);
    expect(caseOf("partial-order").carrier.kindCount(4)).toBe(355);
  });

  it("of tuples of Boolean algebras", () => {
    // All sets of cells but the empty one.
    expect(counts(fullAlgebra)).toEqual([3, 15, 255]);
    // Without zero and top the inner cells cover the places (OEIS A003465: 1, 1, 5, 109, 32297); without zero the outer
    // cell is empty or not besides.
    expect(counts(algebraWithoutEnds)).toEqual([1, 5, 109]);
    expect(counts(algebraWithoutZero)).toEqual([2, 10, 218]);
  });

  it("of extensions, at most what is said", () => {
    for (const { carrier } of cases)
      for (let length = 0; length <= 2; length += 1) {
        const most = Math.max(
          ...carrier.kindExamples(length).map((example) => carrier.extensions(example, 0).length),
        );
        expect(most).toBeLessThanOrEqual(carrier.mostExtensions(length, 0));
        // For Boolean algebras the bound is met, by elements of which no cell is empty.
        if (carrier instanceof BooleanAlgebra) expect(most).toBe(carrier.mostExtensions(length));
      }
    expect(fullAlgebra.carrier.mostExtensions(3, 0)).toBe(3 ** 8);
    expect(fullAlgebra.carrier.mostExtensions(5, 0)).toBe(3 ** 32);
    expect(fullAlgebra.carrier.mostExtensions(6, 0)).toBe(Number.POSITIVE_INFINITY);
    expect(fullAlgebra.carrier.mostExtensions(60, 0)).toBe(Number.POSITIVE_INFINITY);
  });

  it("and no algebra with a zero and without a top", () => {
    expect(() => new BooleanAlgebra({ kind: "boolean-algebra", zero: true, top: false })).toThrow(RangeError);
  });
});

type Holds = (signature: string) => boolean;

/** Which of the sentences are true on a carrier when R holds of the pairs with some signatures. */
function truthsOf(which: Case, holds: Holds, texts: readonly string[]): boolean[] {
  const { structure } = tablesFor(which, [R], (_relation, _kind, signature) => holds(signature));
  return readSentences(texts).map((sentence) => {
    const truth = satisfies(structure, sentence, meter());
    expect(isTrueIn(recordStructure(structure), recordFormula(sentence), meter())).toBe(truth);
    return truth;
  });
}
function expectTrue(which: Case, holds: Holds, texts: readonly string[]): void {
  const truths = truthsOf(which, holds, texts);
  expect(texts.filter((_, index) => !truths[index])).toEqual([]);
}
function expectFalse(which: Case, holds: Holds, texts: readonly string[]): void {
  const truths = truthsOf(which, holds, texts);
  expect(texts.filter((_, index) => truths[index])).toEqual([]);
}

const arc: Holds = (signature) => /:[13]$/.test(signature);
/** Cell 1, of what lies in the first and outside of the second, is empty. */
const below: Holds = (signature) => ((Number(signature.split(":")[1]) >>> 1) & 1) === 0;

describe("what is known of generic structures", () => {
  it("extension axioms (Erdős and Rényi 1963, Rado 1964)", () => {
    expectTrue(caseOf("graph"), arc, [
      "forall x. ~R(x,x)",
      "forall x y. R(x,y) -> R(y,x)",
      "forall x y. x != y -> exists z. R(x,z) & ~R(y,z) & z != y",
      "forall x y z. exists w. R(x,w) & R(y,w) & R(z,w)",
      "forall x y z. exists w. ~R(x,w) & ~R(y,w) & ~R(z,w) & w != x & w != y & w != z",
      // Any two vertices are joined by two steps, so that the diameter is 2.
      "forall x y. exists z. R(x,z) & R(z,y)",
      "exists x y z. R(x,y) & R(y,z) & R(z,x)",
    ]);
    expectFalse(caseOf("graph"), arc, [
      "exists x. forall y. x != y -> R(x,y)",
      "forall x y. R(x,y) | x = y",
      "forall x y z. R(x,y) & R(y,z) -> R(x,z)",
    ]);
  });

  it("tournaments in which any few are beaten by a common one (Schütte; Erdős 1963)", () => {
    expectTrue(caseOf("tournament"), arc, [
      "forall x y. R(x,y) -> ~R(y,x)",
      "forall x y. R(x,y) | R(y,x) | x = y",
      "forall x y. exists z. R(z,x) & R(z,y)",
      "forall x y z. exists w. R(w,x) & R(w,y) & R(w,z)",
      "forall x y. R(x,y) -> exists z. R(y,z) & R(z,x)",
    ]);
    expectFalse(caseOf("tournament"), arc, [
      "exists x. forall y. x != y -> R(x,y)",
      "forall x y z. R(x,y) & R(y,z) -> R(x,z)",
    ]);
  });

  it("digraphs with every pattern of arcs", () => {
    expectTrue(caseOf("digraph"), arc, [
      "forall x. ~R(x,x)",
      "exists x y. R(x,y) & R(y,x)",
      "exists x y. R(x,y) & ~R(y,x)",
      "exists x y. ~R(x,y) & ~R(y,x) & x != y",
      "forall x y. x != y -> exists z. R(x,z) & R(z,x) & R(z,y) & ~R(y,z)",
    ]);
  });

  it("the generic partial order (Schmerl 1979): dense, without ends, directed, with no bounds that are best", () => {
    expectTrue(caseOf("partial-order"), arc, [
      "forall x. ~R(x,x)",
      "forall x y z. R(x,y) & R(y,z) -> R(x,z)",
      "forall x. exists y. R(x,y)",
      "forall x. exists y. R(y,x)",
      "forall x y. R(x,y) -> exists z. R(x,z) & R(z,y)",
      "forall x y. exists z. R(x,z) & R(y,z)",
      "forall x. exists y. x != y & ~R(x,y) & ~R(y,x)",
      // No two that are incomparable have a least upper bound.
      "~(exists x y z. ~R(x,y) & ~R(y,x) & x != y & R(x,z) & R(y,z) & (forall w. R(x,w) & R(y,w) -> w = z | R(z,w)))",
    ]);
    expectFalse(caseOf("partial-order"), arc, [
      "forall x y. R(x,y) | R(y,x) | x = y",
      "forall x y z. ~R(x,y) & ~R(y,x) & ~R(y,z) & ~R(z,y) -> ~R(x,z) & ~R(z,x)",
    ]);
  });
});

describe("what is known of atomless Boolean algebras", () => {
  const order = [
    "forall x. R(x,x)",
    "forall x y. R(x,y) & R(y,x) -> x = y",
    "forall x y z. R(x,y) & R(y,z) -> R(x,z)",
  ];
  const joins = ["forall x y. exists z. forall w. R(x,w) & R(y,w) <-> R(z,w)"];
  const zero = "(forall v. R(o,v))";
  const dense = ["forall x y. R(x,y) & x != y -> exists z. R(x,z) & R(z,y) & x != z & z != y"];
  const [least, greatest] = ["exists x. forall y. R(x,y)", "exists x. forall y. R(y,x)"];

  it("bounded complemented distributive lattices without atoms (Tarski 1949; Koppelberg 1989)", () => {
    expectTrue(fullAlgebra, below, [
      ...order,
      ...joins,
      ...dense,
      least,
      greatest,
      "forall x y. exists z. forall w. R(w,x) & R(w,y) <-> R(w,z)",
      // No atoms: whatever is not zero has something smaller that is not zero.
      "forall x. (exists y. ~R(x,y)) -> exists z. R(z,x) & z != x & (exists y. ~R(z,y))",
      // Complements: a common lower bound is zero, a common upper bound is the top.
      "forall x. exists y. (forall z. R(z,x) & R(z,y) -> forall v. R(z,v)) & (forall z. R(x,z) & R(y,z) -> forall v. R(v,z))",
      // Distributivity: what has nothing in common with y and z has nothing in common with their join.
      `forall x y z. (forall u. R(u,x) & (R(u,y) | R(u,z)) -> forall v. R(u,v)) -> forall o. R(o,x) & (forall w. R(y,w) & R(z,w) -> R(o,w)) -> ${zero}`,
    ]);
    expectFalse(fullAlgebra, below, ["forall x y. R(x,y) | R(y,x)", "forall x. exists y. R(x,y) & x != y"]);
  });

  // The principles as in Varzi, "Mereology" (Stanford Encyclopedia of Philosophy); that classical mereology is the theory of
  // Boolean algebras without zero: Tarski 1935.
  const overlap = (x: string, y: string, u: string) => `(exists ${u}. R(${u},${x}) & R(${u},${y}))`;
  const mereology = [
    ...order,
    // Weak, then strong supplementation, and extensionality of overlap.
    `forall x y. R(x,y) & x != y -> exists z. R(z,y) & ~${overlap("z", "x", "u")}`,
    `forall x y. ~R(y,x) -> exists z. R(z,y) & ~${overlap("z", "x", "u")}`,
    `forall x y. (forall z. ${overlap("z", "x", "u")} <-> ${overlap("z", "y", "u")}) -> x = y`,
    // Sums, products of those that overlap, remainders.
    `forall x y. exists z. forall w. ${overlap("w", "z", "u")} <-> ${overlap("w", "x", "u")} | ${overlap("w", "y", "u")}`,
    `forall x y. ${overlap("x", "y", "u")} -> exists z. forall w. R(w,z) <-> R(w,x) & R(w,y)`,
    `forall x y. ~R(x,y) -> exists z. forall w. R(w,z) <-> R(w,x) & ~${overlap("w", "y", "u")}`,
    // No atoms.
    "forall x. exists y. R(y,x) & y != x",
  ];
  const complements = `forall x. (exists y. ~R(y,x)) -> exists z. forall w. R(w,z) <-> ~${overlap("w", "x", "u")}`;

  it("closed extensional mereology without atoms, with a universe", () => {
    expectTrue(algebraWithoutZero, below, [...mereology, greatest, complements]);
    expectFalse(algebraWithoutZero, below, [least, "forall x y. R(x,y) | R(y,x)"]);
  });

  it("the same without a universe, where everything has something outside", () => {
    expectTrue(algebraWithoutEnds, below, [
      ...mereology,
      "forall x. exists y. R(x,y) & x != y",
      `forall x. exists y. ~${overlap("x", "y", "u")}`,
      "forall x y. exists z. R(x,z) & R(y,z)",
    ]);
    expectFalse(algebraWithoutEnds, below, [greatest, least, complements]);
  });

  it("the axioms of io-43 in infinite-only.json", () => {
    const { axioms } = infiniteOnly.find(({ id }) => id === "io-43")!;
    expectTrue(algebraWithoutZero, below, axioms);
    expect(truthsOf(algebraWithoutEnds, below, axioms)).toContain(false);
    expect(truthsOf(fullAlgebra, below, axioms)).toContain(false);
  });

  it("with zero, mereology fails by supplementation alone", () => {
    const truths = truthsOf(fullAlgebra, below, mereology.slice(0, 4));
    expect(truths).toEqual([true, true, true, false]);
  });
});
