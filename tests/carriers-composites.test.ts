/** Tuples, sums and products of carriers against their definition, and against what is known of such orders. */
import fc from "fast-check";
import { describe, expect, it } from "vitest";
import { buildCarrier } from "../lib/carriers/build.ts";
import { kindExamplesOf } from "../lib/carriers/kind-examples.ts";
import type { Structure, Table } from "../lib/carriers/structure.ts";
import { vocabularyOf } from "../lib/carriers/vocabulary/of.ts";
import type { CarrierDescription } from "../lib/logic/structure-definition.ts";
import { isTrue as isTrueByLoops } from "./support/brute-force.ts";
import {
  composites,
  integers,
  isTrue,
  nameOf,
  naturals,
  points,
  product,
  R,
  rationals,
  structureOf,
  sum,
  tuples,
} from "./support/carriers-composites.ts";
import {
  allPlaces,
  definitionsOn,
  equivalents,
  facts,
  lexicographic,
  play,
  saying,
  sentencesTo,
  trueTuples,
} from "./support/carriers-composites-checks.ts";
import { sentences } from "./support/random-formulas.ts";
import {
  atomicName,
  configurationOf,
  elementsWith,
  isAtomTrue,
  isFormulaTrue,
} from "./support/true-elements.ts";

const seed = Number(process.env.TWOPLACE_SEED ?? 20261201);
const options = (numRuns: number) => ({ seed, numRuns, verbose: 1 as const });
const named = (descriptions: readonly CarrierDescription[]) =>
  descriptions.map((description) => ({ name: nameOf(description), description }));

describe(`on finite components (seed ${seed})`, () => {
  const finite = [
    tuples(points(2), 2),
    tuples(points(3), 1, 0, 1),
    tuples(points(2), 2, 1),
    sum(points(2), points(3)),
    sum(points(1), tuples(points(2), 1, 0)),
    product(points(2), points(3)),
    product(sum(points(1), points(2)), points(2)),
    tuples(product(points(2), points(1)), 1, 1),
  ];

  it.each(named(finite))("$name is a domain of points", ({ description }) => {
    const carrier = buildCarrier(description);
    const elements = elementsWith(description, []);
    expect(carrier.size).toBe(elements.length);
    expect(carrier.extensions(carrier.empty, 1)).toHaveLength(elements.length);
    for (const places of [1, 2, 3]) expect(carrier.kindCount(places)).toBe(elements.length ** places);
  });

  it.each(named(finite))("$name satisfies what holds by loops over the elements", ({ description }) => {
    const elements = elementsWith(description, []);
    fc.assert(
      fc.property(definitionsOn(description), sentences([R], 3), (defined, said) => {
        const holds = new Set<string>();
        for (const [i, x] of elements.entries())
          for (const [j, y] of elements.entries())
            if (isFormulaTrue(defined, description, (variable) => (variable === "x" ? x : y)))
              holds.add(`${i},${j}`);
        const structure = structureOf(description, { relation: R, variables: ["x", "y"], formula: defined });
        expect(isTrue(structure, said)).toBe(isTrueByLoops(said, elements.length, new Map([["R", holds]])));
      }),
      options(40),
    );
  });
});

describe(`by definition (seed ${seed})`, () => {
  it.each(named(composites))("$name has the kinds that tables may tell apart", ({ description }) => {
    const carrier = buildCarrier(description);
    for (const length of [1, 2]) {
      const examples = kindExamplesOf(carrier, length);
      expect(examples).toHaveLength(carrier.kindCount(length));
      expect(examples.map((example) => carrier.kindOf(example, allPlaces(length)))).toEqual([
        ...examples.keys(),
      ]);
      const names = new Map<number, string>();
      const see = (elements: Parameters<typeof atomicName>[1]): void => {
        const kind = carrier.kindOf(configurationOf(description, elements), allPlaces(length));
        const name = atomicName(description, elements);
        expect(names.get(kind) ?? name).toBe(name);
        names.set(kind, name);
      };
      const few = elementsWith(description, [0, 1, 2, 3, 4, 5]);
      if (length === 1) for (const one of few) see([one]);
      else for (const one of few) for (const other of few) see([one, other]);
      expect(new Set(names.values()).size).toBe(names.size);
      expect(names.size).toBe(carrier.kindCount(length));
    }
  });

  it.each(named(composites))("$name answers every move of a game", ({ description }) => {
    const carrier = buildCarrier(description);
    fc.assert(
      fc.property(fc.gen(), (gen) => {
        play(carrier, description, 3, gen);
      }),
      options(12),
    );
  });

  it.each(named(composites))("$name restricts, names and bounds as the laws say", ({ description }) => {
    const carrier = buildCarrier(description);
    fc.assert(
      fc.property(
        trueTuples(description, 3),
        fc.array(fc.nat(2), { minLength: 1, maxLength: 3 }),
        (elements, chosen) => {
          const configuration = configurationOf(description, elements);
          const places = chosen.map((place) => place % elements.length);
          const restricted = carrier.restrict(configuration, places);
          const own = configurationOf(
            description,
            places.map((place) => elements[place]!),
          );
          for (const toCome of [0, 1, 2])
            expect(carrier.key(restricted, toCome)).toBe(carrier.key(own, toCome));
          expect(carrier.kindOf(restricted, allPlaces(places.length))).toBe(
            carrier.kindOf(configuration, places),
          );
          expect(carrier.same(configuration, 0, elements.length - 1)).toBe(
            JSON.stringify(elements[0]) === JSON.stringify(elements.at(-1)),
          );
          if (carrier.mostExtensions(elements.length, 1) > 5000) return;
          const extensions = carrier.extensions(configuration, 1);
          expect(extensions.length).toBeGreaterThan(0);
          expect(extensions.length).toBeLessThanOrEqual(carrier.mostExtensions(elements.length, 1));
          expect(new Set(extensions.map((one) => carrier.key(one, 1))).size).toBe(extensions.length);
        },
      ),
      options(20),
    );
  });

  it.each(named(composites.filter(({ kind }) => kind !== "product")))(
    "$name has symmetries that make isomorphic structures",
    ({ description }) => {
      const carrier = buildCarrier(description);
      const kinds = carrier.kindCount(2);
      for (const symmetry of carrier.symmetries()) {
        const images = Array.from({ length: kinds }, (_, kind) => symmetry.image(2, kind));
        expect(images.map((image) => symmetry.image(2, image))).toEqual([...images.keys()]);
        fc.assert(
          fc.property(definitionsOn(description), sentences([R], 2), (defined, said) => {
            const structure = structureOf(description, {
              relation: R,
              variables: ["x", "y"],
              formula: defined,
            });
            const { holds } = structure.tables.get("R")!;
            const table: Table = { relation: R, holds: holds.map((_, kind) => holds[images[kind]!]!) };
            const moved: Structure = { carrier: structure.carrier, tables: new Map([["R", table]]) };
            expect(isTrue(moved, said)).toBe(isTrue(structure, said));
          }),
          options(10),
        );
      }
    },
  );

  it("exchanges copies of the same width and parts that are alike", () => {
    const count = (description: CarrierDescription) => buildCarrier(description).symmetries().length;
    expect(count(tuples(rationals, 1, 1, 1, 0, 0))).toBe(4);
    expect(count(tuples(rationals, 2, 1))).toBe(0);
    expect(count(sum(naturals(), integers(), naturals()))).toBe(1);
    expect(count(sum(naturals(), naturals(1, 0)))).toBe(0);
    expect(count(product(rationals, rationals))).toBe(0);
  });
});

describe(`definitions (seed ${seed})`, () => {
  it.each(named(composites))("on $name are true of kinds as of elements", ({ description }) => {
    const carrier = buildCarrier(description);
    const vocabulary = vocabularyOf(carrier);
    const variables = ["x", "y", "z"];
    const atoms = vocabulary.atoms(variables);
    for (const one of atoms) expect(vocabulary.complaint(one), JSON.stringify(one)).toBeNull();
    fc.assert(
      fc.property(trueTuples(description, 3, 3), (elements) => {
        const configuration = configurationOf(description, elements);
        const place = (variable: string) => variables.indexOf(variable);
        for (const one of atoms)
          expect(vocabulary.holds(one, configuration, place), JSON.stringify([one, elements])).toBe(
            isAtomTrue(one, description, (variable) => elements[place(variable)]!),
          );
      }),
      options(30),
    );
  });
});

describe(`orders (seed ${seed})`, () => {
  it.each(facts)("$name is as known", ({ description, order, facts: known }) => {
    const structure = structureOf(description, { relation: R, variables: ["x", "y"], formula: order });
    const said = Object.fromEntries(
      Object.entries(saying).map(([what, text]) => [what, isTrue(structure, text)]),
    );
    expect(said).toEqual(
      Object.fromEntries(Object.keys(saying).map((what, place) => [what, known[place] ?? true])),
    );
  });

  it.each(
    equivalents.map(([left, right]) => ({ names: `${nameOf(left)} and ${nameOf(right)}`, left, right })),
  )("no sentence tells $names apart", ({ left, right }) => {
    const [first, second] = [left, right].map((description) =>
      structureOf(description, { relation: R, variables: ["x", "y"], formula: lexicographic(description) }),
    );
    fc.assert(
      fc.property(sentencesTo(3), (said) => {
        expect(isTrue(first!, said)).toBe(isTrue(second!, said));
      }),
      options(60),
    );
  });

  it("pairs in lexicographic order are copies at each element", () => {
    const pairs = tuples(naturals(), 2);
    const copies = product(naturals(), naturals());
    const [first, second] = [pairs, copies].map((description) =>
      structureOf(description, { relation: R, variables: ["x", "y"], formula: lexicographic(description) }),
    );
    fc.assert(
      fc.property(sentencesTo(2), (said) => {
        expect(isTrue(first!, said)).toBe(isTrue(second!, said));
      }),
      options(60),
    );
  });
});
