/** Canonical forms against isomorphism by definition, and against published numbers of classes. */
import fc from "fast-check";
import { describe, expect, it } from "vitest";
import { Points } from "../lib/carriers/points.ts";
import type { Structure } from "../lib/carriers/structure.ts";
import { Meter, WorkEnded } from "../lib/logic/meter.ts";
import { Canoniser } from "../lib/structures/canonical.ts";
import { areIsomorphic, automorphismCount, canonicalForm } from "../lib/structures/isomorphism.ts";
import { Solver } from "../lib/structures/sat/solver.ts";

const seed = Number(process.env.TWOPLACE_SEED ?? 20261201);
const options = (numRuns: number) => ({ seed, numRuns, verbose: 1 as const });

/** One table for each relation, over points from 0. */
type Tables = readonly Uint8Array[];

function structure(
  size: number,
  names: readonly string[],
  places: readonly number[],
  tables: Tables,
): Structure {
  return {
    carrier: new Points(size),
    tables: new Map(
      tables.map((holds, index) => [
        names[index]!,
        { relation: { name: names[index]!, places: places[index]!, infix: false }, holds },
      ]),
    ),
  };
}

/** The structure in which point i has become `to[i]`. */
function renamed(
  size: number,
  places: readonly number[],
  tables: Tables,
  to: readonly number[],
): Uint8Array[] {
  return tables.map((table, index) => {
    const out = new Uint8Array(table.length);
    table.forEach((value, kind) => {
      let image = 0;
      let weight = 1;
      for (let place = 0, rest = kind; place < places[index]!; place += 1, rest = Math.floor(rest / size)) {
        image += to[rest % size]! * weight;
        weight *= size;
      }
      out[image] = value;
    });
    return out;
  });
}

function permutations(size: number): number[][] {
  if (size === 0) return [[]];
  return permutations(size - 1).flatMap((rest) =>
    Array.from({ length: size }, (_, at) => [...rest.slice(0, at), size - 1, ...rest.slice(at)]),
  );
}

const same = (a: Tables, b: Tables) =>
  a.every((table, index) => table.every((bit, kind) => bit === b[index]![kind]));

const shapes = fc.record({
  size: fc.integer({ min: 1, max: 5 }),
  places: fc.constantFrom([2], [1, 2], [2, 2], [3], [1, 1], [2, 3]),
});

/** Two structures of one shape; often the second comes of the first by a renaming and at most one change. */
const pairs = shapes.chain(({ size, places }) => {
  const tables = fc.tuple(
    ...places.map((count) =>
      fc
        .array(fc.constantFrom(0, 1), { minLength: size ** count, maxLength: size ** count })
        .map((bits) => Uint8Array.from(bits)),
    ),
  );
  return fc.record({
    size: fc.constant(size),
    places: fc.constant(places),
    first: tables,
    other: tables,
    order: fc.shuffledSubarray(
      Array.from({ length: size }, (_, i) => i),
      { minLength: size },
    ),
    change: fc.option(fc.nat(), { freq: 1 }),
    unrelated: fc.boolean(),
  });
});

describe("canonical form", () => {
  it("is shared exactly by isomorphic structures", () => {
    const seen = { yes: 0, no: 0 };
    fc.assert(
      fc.property(pairs, ({ size, places, first, other, order, change, unrelated }) => {
        const second = unrelated ? other : renamed(size, places, first, order);
        if (!unrelated && change !== null) second[0]![change % second[0]!.length]! ^= 1;
        const isomorphic = permutations(size).some((to) => same(renamed(size, places, first, to), second));
        seen[isomorphic ? "yes" : "no"] += 1;
        const names = ["R", "S"];
        const a = structure(size, names, places, first);
        const b = structure(size, names, places, second);
        expect(canonicalForm(a) === canonicalForm(b)).toBe(isomorphic);
        expect(areIsomorphic(a, b)).toBe(isomorphic);
      }),
      options(1500),
    );
    expect(seen.yes).toBeGreaterThan(300);
    expect(seen.no).toBeGreaterThan(300);
  });

  it("is the table in the order of points that goes with it", () => {
    fc.assert(
      fc.property(pairs, ({ size, places, first }) => {
        const canoniser = new Canoniser(size, places);
        const form = canoniser.canonise(first);
        const to: number[] = [];
        canoniser.order.forEach((point, index) => {
          to[point] = index;
        });
        const bits = [...form].map((char) => (char.charCodeAt(0) - 48).toString(2).padStart(6, "0")).join("");
        const table = renamed(size, places, first, to)
          .map((part) => part.join(""))
          .join("");
        expect(bits.slice(0, table.length)).toBe(table);
      }),
      options(300),
    );
  });

  it("counts automorphisms as a trial of all renamings does", () => {
    const counts = new Set<number>();
    fc.assert(
      fc.property(pairs, ({ size, places, first, order }) => {
        const all = permutations(size).filter((to) => same(renamed(size, places, first, to), first)).length;
        counts.add(all);
        const own = structure(size, ["R", "S"], places, first);
        expect(automorphismCount(own)).toBe(BigInt(all));
        const other = structure(size, ["R", "S"], places, renamed(size, places, first, order));
        expect(automorphismCount(other)).toBe(BigInt(all));
      }),
      options(1500),
    );
    for (const count of [1, 2, 6]) expect(counts).toContain(count);
  });

  it("counts automorphisms of sparse and regular relations as a trial of all renamings does", () => {
    // Few tuples, or differences modulo n, so that there is much symmetry.
    const symmetric = fc.integer({ min: 3, max: 6 }).chain((size) =>
      fc
        .oneof(
          fc
            .uniqueArray(fc.nat(size * size - 1), { maxLength: 3 })
            .map((kinds) =>
              Uint8Array.from({ length: size * size }, (_, kind) => Number(kinds.includes(kind))),
            ),
          fc
            .uniqueArray(fc.nat(size - 1))
            .map((steps) =>
              Uint8Array.from({ length: size * size }, (_, kind) =>
                Number(steps.includes(((((kind % size) - Math.floor(kind / size)) % size) + size) % size)),
              ),
            ),
        )
        .map((table) => ({ size, table })),
    );
    fc.assert(
      fc.property(symmetric, ({ size, table }) => {
        const all = permutations(size).filter((to) => same(renamed(size, [2], [table], to), [table])).length;
        expect(automorphismCount(structure(size, ["R"], [2], [table]))).toBe(BigInt(all));
      }),
      options(300),
    );
  });

  it("tells relations apart by name, places and size", () => {
    const table = (size: number, places: number) => [new Uint8Array(size ** places)];
    const forms = [
      structure(2, ["R"], [2], table(2, 2)),
      structure(2, ["S"], [2], table(2, 2)),
      structure(2, ["R"], [1], table(2, 1)),
      structure(3, ["R"], [2], table(3, 2)),
      structure(2, ["R", "S"], [2, 2], [...table(2, 2), ...table(2, 2)]),
      structure(2, [], [], []),
    ];
    expect(new Set(forms.map((each) => canonicalForm(each))).size).toBe(forms.length);
    // The order in which relations are listed does not matter.
    const one = Uint8Array.of(0, 1, 0, 0);
    const two = Uint8Array.of(1, 0, 0, 0);
    expect(canonicalForm(structure(2, ["R", "S"], [2, 2], [one, two]))).toBe(
      canonicalForm(structure(2, ["S", "R"], [2, 2], [two, one])),
    );
  });
});

/** The number of classes among all relations on n points that satisfy clauses on their entries. */
function classes(
  n: number,
  clausesFor: (at: (i: number, j: number) => number) => readonly (readonly number[])[],
): number {
  const solver = new Solver();
  const variables = Array.from({ length: n * n }, () => solver.newVariable());
  for (const clause of clausesFor((i, j) => i * n + j + 1)) solver.addClause(clause);
  const canoniser = new Canoniser(n, [2]);
  const forms = new Set<string>();
  solver.enumerate(new Meter(10_000_000), variables, (values) => {
    forms.add(canoniser.canonise([values]));
    return true;
  });
  return forms.size;
}

const points = (n: number) => Array.from({ length: n }, (_, i) => i);

describe("numbers of classes", () => {
  it("of relations (OEIS A000595)", () => {
    expect([1, 2, 3, 4].map((n) => classes(n, () => []))).toEqual([2, 10, 104, 3044]);
  });
  it("of partial orders (OEIS A000112)", () => {
    const order = (n: number) =>
      classes(n, (at) =>
        points(n).flatMap((i) =>
          points(n).flatMap((j) => [
            i === j ? [at(i, i)] : [-at(i, j), -at(j, i)],
            ...points(n).map((k) => [-at(i, j), -at(j, k), at(i, k)]),
          ]),
        ),
      );
    expect([1, 2, 3, 4, 5, 6].map(order)).toEqual([1, 2, 5, 16, 63, 318]);
  });
  it("of loopless digraphs (OEIS A000273)", () => {
    const digraph = (n: number) => classes(n, (at) => points(n).map((i) => [-at(i, i)]));
    expect([1, 2, 3, 4].map(digraph)).toEqual([1, 3, 16, 218]);
  });
  it("of tournaments (OEIS A000568)", () => {
    const tournament = (n: number) =>
      classes(n, (at) =>
        points(n).flatMap((i) =>
          points(n).flatMap((j) =>
            i === j
              ? [[-at(i, i)]]
              : [
                  [at(i, j), at(j, i)],
                  [-at(i, j), -at(j, i)],
                ],
          ),
        ),
      );
    expect([1, 2, 3, 4, 5, 6].map(tournament)).toEqual([1, 1, 2, 4, 12, 56]);
  });
  it("of graphs (OEIS A000088)", () => {
    const graph = (n: number) =>
      classes(n, (at) =>
        points(n).flatMap((i) =>
          points(n).flatMap((j) => (i === j ? [[-at(i, i)]] : [[-at(i, j), at(j, i)]])),
        ),
      );
    expect([1, 2, 3, 4, 5, 6].map(graph)).toEqual([1, 2, 4, 11, 34, 156]);
  });
});

describe("structures with much symmetry", () => {
  /** The relation on n points that holds of (i, j) where the function says so. */
  const relation = (n: number, of: (i: number, j: number) => boolean) =>
    Uint8Array.from({ length: n * n }, (_, kind) => (of(Math.floor(kind / n), kind % n) ? 1 : 0));
  /** Points shuffled in a fixed way. */
  const shuffle = (n: number) => points(n).map((i) => (i * 7 + 3) % n);
  // Work is counted in pairs and tuples looked at, so that a search through all orders of the points would show.
  const formWithin = (n: number, places: number, table: Uint8Array) => {
    const meter = new Meter(1_000_000);
    const form = new Canoniser(n, [places]).canonise([table], meter);
    return { form, steps: meter.steps };
  };

  it.each([
    ["empty", 20, () => false],
    ["a cycle", 20, (i: number, j: number) => j === (i + 1) % 20],
    ["ten edges", 20, (i: number, j: number) => j === (i ^ 1)],
    ["four cycles of five", 20, (i: number, j: number) => j === i - (i % 5) + ((i + 1) % 5)],
    ["five blocks of four", 20, (i: number, j: number) => Math.floor(i / 4) === Math.floor(j / 4)],
    ["a cube of dimension four", 16, (i: number, j: number) => [1, 2, 4, 8].includes(i ^ j)],
    [
      "the quadratic residues modulo 19",
      19,
      (i: number, j: number) => [1, 4, 5, 6, 7, 9, 11, 16, 17].includes((j - i + 19) % 19),
    ],
  ])("%s", (_, n, of) => {
    const table = relation(n, of);
    const { form, steps } = formWithin(n, 2, table);
    expect(formWithin(n, 2, renamed(n, [2], [table], shuffle(n))[0]!).form).toBe(form);
    expect(steps).toBeLessThan(1000);
  });

  it("three places, empty", () => {
    expect(formWithin(20, 3, new Uint8Array(8000)).steps).toBeLessThan(1000);
  });

  it("tells graphs apart that refinement alone cannot", () => {
    // The lattice graph on 4 × 4 points and Shrikhande's graph (1959): same strong regularity, not isomorphic.
    const lattice = relation(16, (i, j) => i !== j && (i >> 2 === j >> 2 || (i & 3) === (j & 3)));
    const steps = ["0,1", "0,3", "1,0", "3,0", "1,1", "3,3"];
    const shrikhande = relation(16, (i, j) =>
      steps.includes(`${((j >> 2) - (i >> 2) + 4) % 4},${((j & 3) - (i & 3) + 4) % 4}`),
    );
    const forms = [lattice, shrikhande].map((table) => formWithin(16, 2, table).form);
    expect(forms[0]).not.toBe(forms[1]);
    expect(formWithin(16, 2, renamed(16, [2], [lattice], shuffle(16))[0]!).form).toBe(forms[0]);
    expect(formWithin(16, 2, renamed(16, [2], [shrikhande], shuffle(16))[0]!).form).toBe(forms[1]);
  });

  it.each([
    // The orders are common knowledge in group theory.
    ["twenty points and nothing else: 20!", 20, () => false, 2432902008176640000n],
    ["a directed cycle: its rotations", 20, (i: number, j: number) => j === (i + 1) % 20, 20n],
    ["ten arcs both ways: 2^10 · 10!", 20, (i: number, j: number) => j === (i ^ 1), 3715891200n],
    ["a cube of dimension four: 2^4 · 4!", 16, (i: number, j: number) => [1, 2, 4, 8].includes(i ^ j), 384n],
    [
      "the tournament of the quadratic residues modulo 19: x ↦ ax + b, a a square",
      19,
      (i: number, j: number) => [1, 4, 5, 6, 7, 9, 11, 16, 17].includes((j - i + 19) % 19),
      171n,
    ],
    [
      "Petersen's graph, arcs between disjoint pairs of five: 5!",
      10,
      (i: number, j: number) => {
        const of = points(5).flatMap((a) => points(a).map((b) => [a, b]));
        return !of[i]!.some((a) => of[j]!.includes(a));
      },
      120n,
    ],
  ])("automorphisms of %s", (_, n, of, count) => {
    const tables = [relation(n, of as (i: number, j: number) => boolean)];
    expect(automorphismCount(structure(n, ["R"], [2], tables))).toBe(count);
    expect(automorphismCount(structure(n, ["R"], [2], renamed(n, [2], tables, shuffle(n))))).toBe(count);
  });

  it("ends with the budget", () => {
    const empty = structure(20, ["R"], [3], [new Uint8Array(8000)]);
    expect(() => canonicalForm(empty, new Meter(1))).toThrow(WorkEnded);
  });
});
