/** Tuples, sums and products of carriers against their definition, and against what is known of such orders. */
import fc from "fast-check";
import { describe, expect, it } from "vitest";
import { buildCarrier } from "../lib/carriers/build.ts";
import { kindExamplesOf } from "../lib/carriers/kind-examples.ts";
import { mostConfigurations } from "../lib/carriers/listing.ts";
import type { Structure, Table } from "../lib/carriers/structure.ts";
import { vocabularyOf } from "../lib/carriers/vocabulary/of.ts";
import type { CarrierDescription } from "../lib/logic/structure-definition.ts";
import {
  atom,
  composites,
  finite,
  integers,
  isTrue,
  nameOf,
  naturals,
  ofAllKinds,
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
  checkByLoops,
  checkEquivalent,
  checkGames,
  definitionsOn,
  equivalents,
  facts,
  saying,
  sentencesTo,
  trueTuples,
} from "./support/carriers-composites-checks.ts";
import {
  atomicName,
  configurationOf,
  elementsWith,
  isAtomTrue,
  type TrueElement,
} from "./support/true-elements.ts";

const seed = Number(process.env.TWOPLACE_SEED ?? 20261201);
const options = (numRuns: number) => ({ seed, numRuns, verbose: 1 as const });
const named = (descriptions: readonly CarrierDescription[]) =>
  descriptions.map((description) => ({ name: nameOf(description), description }));

describe(`on finite components (seed ${seed})`, () => {
  it.each(named(finite))("$name is a domain of points", ({ description }) => {
    const carrier = buildCarrier(description);
    const elements = elementsWith(description, []);
    expect(carrier.size).toBe(elements.length);
    expect(carrier.extensions(carrier.empty, 1)).toHaveLength(elements.length);
    for (const places of [1, 2, 3]) expect(carrier.kindCount(places)).toBe(elements.length ** places);
  });

  it.each(named(finite))("$name satisfies what holds by loops over the elements", ({ description }) => {
    checkByLoops(description, options(15));
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
    checkGames(description, 3, options(6));
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
      options(10),
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
          fc.property(definitionsOn(description), sentencesTo(2), (defined, said) => {
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
    expect(count(tuples(rationals, 1, 1, 1, 1, 1, 1, 1, 0))).toBe(6);
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

describe("all atoms together", () => {
  it.each(named(ofAllKinds))("tell all kinds on $name apart", ({ description }) => {
    const carrier = buildCarrier(description);
    const vocabulary = vocabularyOf(carrier);
    for (const length of [1, 2, 3]) {
      if (length === 3 && mostConfigurations(carrier, 3) > 30_000) continue;
      const variables = ["x", "y", "z"].slice(0, length);
      const place = (variable: string) => variables.indexOf(variable);
      const atoms = vocabulary.atoms(variables);
      expect(atoms.map((one) => vocabulary.complaint(one)).filter((one) => one !== null)).toEqual([]);
      const values = kindExamplesOf(carrier, length).map((example) =>
        atoms.map((one) => Number(vocabulary.holds(one, example, place))).join(""),
      );
      expect(new Set(values).size).toBe(carrier.kindCount(length));
    }
  });

  it.each(named(ofAllKinds))("have one value on each kind on $name", ({ description }) => {
    const carrier = buildCarrier(description);
    const vocabulary = vocabularyOf(carrier);
    const variables = ["x", "y"];
    const place = (variable: string) => variables.indexOf(variable);
    const atoms = vocabulary.atoms(variables);
    const valuesOf = (configuration: unknown, at: readonly number[]) =>
      atoms.map((one) => Number(vocabulary.holds(one, configuration, (name) => at[place(name)]!))).join("");
    const values = kindExamplesOf(carrier, 2).map((example) => valuesOf(example, [0, 1]));
    fc.assert(
      fc.property(fc.gen(), (choose) => {
        let configuration = carrier.empty;
        for (let toCome = 2; toCome >= 0; toCome -= 1) {
          if (carrier.mostExtensions(2 - toCome, toCome) > 20_000) return;
          const extensions = carrier.extensions(configuration, toCome);
          configuration = extensions[choose(fc.nat, { max: extensions.length - 1 })];
        }
        for (const first of [0, 1, 2])
          for (const second of [0, 1, 2])
            expect(valuesOf(configuration, [first, second])).toBe(
              values[carrier.kindOf(configuration, [first, second])],
            );
      }),
      options(20),
    );
  });
});

describe("keys", () => {
  it.each(named(ofAllKinds))("on $name that are the same stay so", ({ description }) => {
    const carrier = buildCarrier(description);
    /** For each key for two to come, those for fewer and those of restrictions. */
    const found = new Map<string | number, string>();
    fc.assert(
      fc.property(fc.gen(), (choose) => {
        // Told apart more finely than is asked for, so that keys recur.
        let configuration = carrier.empty;
        for (const toCome of [4, 3]) {
          if (carrier.mostExtensions(4 - toCome, toCome) > 20_000) return;
          const extensions = carrier.extensions(configuration, toCome);
          configuration = extensions[choose(fc.nat, { max: extensions.length - 1 })];
        }
        const keys = [
          ...[1, 0].map((toCome) => carrier.key(configuration, toCome)),
          ...[[0], [1], [1, 0]].map((places) => carrier.key(carrier.restrict(configuration, places), 2)),
        ].join(" | ");
        const key = carrier.key(configuration, 2);
        expect(found.get(key) ?? keys).toBe(keys);
        found.set(key, keys);
      }),
      options(40),
    );
  });
});

describe("complaints", () => {
  const complaintOf = (description: CarrierDescription, text: string) =>
    vocabularyOf(buildCarrier(description)).complaint(atom(text));

  it.each([
    { of: tuples(rationals, 2, 1), text: "x < y", message: /tuple.*coordinates/, suggestion: "`x.1`" },
    { of: tuples(rationals, 2, 1), text: "x.3 < y.1", message: /coordinates 1 to 2, and no `3`/ },
    { of: tuples(rationals, 1, 1), text: "x.2 < y.1", message: /one coordinate, 1, and no `2`/ },
    { of: tuples(rationals, 1, 1), text: "x.outer < y.outer", message: /no `outer`/, suggestion: "`x.1`" },
    { of: tuples(rationals, 1, 1), text: "x.1 = y.1 + 1", message: /`y\.1 \+ 1` says nothing there/ },
    { of: tuples(rationals, 1, 1), text: "copy(x) = 3", message: /copies 1 to 2 here, and no 3/ },
    { of: tuples(rationals, 2), text: "copy(x) = 1", message: /one copy only/ },
    { of: tuples(rationals, 0, 0), text: "x.1 = y.1", message: /single points/ },
    { of: tuples(naturals(), 1, 1), text: "0 < 1", message: /nothing of an element/ },
    { of: product(rationals, integers()), text: "x < y", message: /two components/ },
    { of: product(rationals, integers()), text: "x.1 < y.1", message: /outer and inner, and no `1`/ },
    {
      of: product(rationals, integers()),
      text: "x.outer < y.inner",
      message: /nothing to do with each other/,
    },
    { of: product(rationals, integers()), text: "x.outer = 0", message: /number 0 says nothing/ },
    { of: sum(rationals, rationals), text: "x = 0", message: /number 0 says nothing/ },
    { of: sum(rationals, rationals), text: "part(x) = 3", message: /parts 1 to 2 here, and no 3/ },
    { of: points(3), text: "x = 4", message: /points 1 to 3 here, and no 4/ },
    { of: sum(naturals(), points(2)), text: "x.1 = y.1", message: /no components/ },
  ])("of `$text`", ({ of, text, message, suggestion }) => {
    const complaint = complaintOf(of, text);
    expect(complaint?.message).toMatch(message);
    expect(complaint?.message).not.toMatch(/[.!]$/);
    if (suggestion !== undefined) expect(complaint?.suggestion).toContain(suggestion);
    expect(complaint?.isUnsettled).toBeUndefined();
  });

  it("are made of what says nothing in any part, and of what kinds do not tell in some", () => {
    expect(complaintOf(sum(naturals(0, 1), rationals), "x = 0")).toBeNull();
    expect(complaintOf(sum(rationals, naturals()), "x = 0")?.isUnsettled).toBe(true);
    expect(complaintOf(sum(integers(1), naturals()), "y = x + 1")?.isUnsettled).toBe(true);
    expect(complaintOf(sum(integers(1), rationals), "y = x + 1")).toBeNull();
    expect(
      complaintOf(product(rationals, sum(integers(1), naturals(1, 0))), "y.inner = x.inner + 1"),
    ).toBeNull();
  });

  it("are not made of whole elements that are said to be the same", () => {
    for (const description of ofAllKinds) expect(complaintOf(description, "x = y")).toBeNull();
  });
});

describe("what is said of what is not there", () => {
  const truth = (description: CarrierDescription, text: string, ...elements: readonly TrueElement[]) =>
    vocabularyOf(buildCarrier(description)).holds(
      atom(text),
      configurationOf(description, elements),
      (variable) => "xy".indexOf(variable),
    );

  it("is false", () => {
    const pairs = tuples(rationals, 2, 0);
    const pair = { tag: 0, coordinates: [1, 2] };
    const point = { tag: 1, coordinates: [] };
    expect(truth(pairs, "x.1 < x.2", pair)).toBe(true);
    expect(truth(pairs, "x.1 < x.2", point)).toBe(false);
    expect(truth(pairs, "x.1 ≤ y.1", pair, point)).toBe(false);
    expect(truth(pairs, "x = y", point, point)).toBe(true);
    const lines = sum(naturals(0, 1), rationals);
    expect(truth(lines, "x < y", { part: 0, element: 1 }, { part: 1, element: 2 })).toBe(false);
    expect(truth(lines, "x = 0", { part: 0, element: 0 })).toBe(true);
    expect(truth(lines, "x = 0", { part: 1, element: 0 })).toBe(false);
    const copies = product(rationals, integers());
    expect(truth(copies, "x.inner < y.inner", { outer: 0, inner: 0 }, { outer: 0, inner: 1 })).toBe(true);
    expect(truth(copies, "x.inner < y.inner", { outer: 0, inner: 0 }, { outer: 1, inner: 1 })).toBe(false);
    expect(truth(copies, "x.inner = y.inner", { outer: 0, inner: 0 }, { outer: 1, inner: 0 })).toBe(false);
    expect(truth(copies, "x.outer = y.outer", { outer: 0, inner: 0 }, { outer: 0, inner: 1 })).toBe(true);
    const nested = sum(sum(naturals(), rationals), points(2));
    expect(truth(nested, "part(x) = 2", { part: 0, element: { part: 1, element: 5 } })).toBe(true);
    expect(truth(nested, "part(x) = 3", { part: 1, element: 2 })).toBe(true);
    expect(truth(nested, "copy(x) = 2", { part: 1, element: 2 })).toBe(true);
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
    checkEquivalent(left, right, 3, options(40));
  });

  it("the random sentences tell orders with other ends, or other next elements, apart from ω", () => {
    const said = fc.sample(sentencesTo(3), { seed, numRuns: 300 });
    const values = facts.map(({ description, order }) => {
      const structure = structureOf(description, { relation: R, variables: ["x", "y"], formula: order });
      return said.map((one) => isTrue(structure, one)).join();
    });
    const plain = facts.map(({ facts: known }) => known.slice(0, 4).join());
    for (const [place, known] of plain.entries())
      if (known !== plain[0]) expect(values[place]).not.toBe(values[0]);
    expect(plain.filter((known) => known !== plain[0]).length).toBeGreaterThan(5);
  });

  it("pairs in lexicographic order are copies at each element", () => {
    checkEquivalent(tuples(naturals(), 2), product(naturals(), naturals()), 2, options(60));
  });
});
