/**
 * Named properties say what their definitions elsewhere say, on all relations on up to 3 points and on samples of
 * 4 and 5 points.
 */
import fc from "fast-check";
import { describe, expect, test } from "vitest";
import { and, type Formula, freeVariables, type RelationSymbol, relationsOf } from "../lib/logic/formula.ts";
import { findProperty, namedProperties, propertyNames, propertyOf } from "../lib/logic/properties.ts";
import { allInterpretations, type Interpretation, isTrue } from "./support/brute-force.ts";
import { entryOf, propertyCodes, propertySentences, readSentences, values } from "./support/corpora.ts";

const R: RelationSymbol = { name: "R", places: 2, infix: false };

const small: readonly { readonly size: number; readonly tables: Interpretation }[] = [1, 2, 3].flatMap(
  (size) => [...allInterpretations(size, [R])].map((tables) => ({ size, tables })),
);

/** Printed by fast-check when a property fails; changed by hand now and then. */
const SEED = 20_240_701;

/**
 * Relations on 4 and 5 points, where four variables can stand for different points: any relations, and of each the
 * symmetric closure of its pairs of different points and the transitive closure of its pairs that go up, without loops and with all.
 */
const larger = fc
  .sample(
    fc.record({
      size: fc.constantFrom(4, 5),
      pairs: fc.uniqueArray(fc.tuple(fc.nat(4), fc.nat(4)), { selector: String, maxLength: 14 }),
    }),
    { seed: SEED, numRuns: 40 },
  )
  .flatMap(({ size, pairs }) => {
    const inside = pairs.filter(([a, b]) => a < size && b < size);
    const different = inside.filter(([a, b]) => a !== b);
    const both = different.flatMap(([a, b]) => [`${a},${b}`, `${b},${a}`]);
    const up = new Set(different.filter(([a, b]) => a < b).map(String));
    for (let middle = 0; middle < size; middle += 1)
      for (let a = 0; a < size; a += 1)
        for (let b = 0; b < size; b += 1)
          if (up.has(`${a},${middle}`) && up.has(`${middle},${b}`)) up.add(`${a},${b}`);
    const order = new Set([...up, ...["0,0", "1,1", "2,2", "3,3", "4,4"].slice(0, size)]);
    return [new Set(inside.map(String)), new Set(both), up, order].map((table) => ({
      size,
      tables: new Map([["R", table]]) as Interpretation,
    }));
  });

const relations = [...small, ...larger];

/** On which of these relations a sentence is true, as a string of digits. */
function truthOn(sentence: Formula): string {
  return relations.map(({ size, tables }) => (isTrue(sentence, size, tables) ? "1" : "0")).join("");
}

function sentenceOf(...names: readonly string[]): Formula {
  return and(
    ...names.map((name) => {
      const property = findProperty(name);
      if (property === undefined) throw new Error(`no property ${name}`);
      return propertyOf(property, R);
    }),
  );
}

/** Codes of the check values that are no abbreviation of the name beside them. */
const NAME_OF_CODE: Readonly<Record<string, string>> = {
  nt: "negatively-transitive",
  fe: "ferrers",
  st: "semitransitive",
  II: "indifference-transitive",
  PI: "pi-transitive",
  IP: "ip-transitive",
  pd: "difunctional",
  SSP: "strong-supplementation",
  WSP: "weak-supplementation",
  isuc: "immediate-successors",
  ipre: "immediate-predecessors",
  EXT: "extensional",
  EMPTY: "empty-set",
  ADJ: "adjunction",
  MEET: "binary-meets",
  JOIN: "binary-joins",
};

// Burghardt, "Simple Laws about Nonprominent Properties of Binary Relations" (2018), Definition 1, as the check
// values have it.
const definitions = entryOf("b-definitions").expected as Record<string, { name: string; definition: string }>;

describe("the 24 properties of Burghardt 2018", () => {
  test.each(Object.entries(definitions))("%s", (code, { name }) => {
    const ours = name.toLowerCase().replaceAll(" ", "-");
    const theirs = and(...readSentences(propertySentences(code)));
    expect(truthOn(sentenceOf(ours))).toBe(truthOn(theirs));
  });
});

describe("the coded properties of the check values", () => {
  test.each(Object.entries(propertyCodes))("%s", (code, text) => {
    const name = NAME_OF_CODE[code] ?? definitions[code]!.name.toLowerCase().replaceAll(" ", "-");
    expect(truthOn(sentenceOf(name))).toBe(truthOn(and(...readSentences([text]))));
  });
});

// Counted classes (OEIS; the sequences stand in the entries) by the names that we give them.
const CLASSES: Readonly<Record<string, string>> = {
  "a-count-reflexive": "reflexive",
  "a-count-symmetric": "symmetric",
  "a-count-asymmetric": "asymmetric",
  "a-count-refl_antisym": "reflexive antisymmetric",
  "a-count-transitive": "transitive",
  "a-count-partialorder": "partial-order",
  "a-count-strictpartialorder": "strict-order",
  "a-count-linear": "linear-order",
  "a-count-strictlinear": "strict-linear-order",
  "a-count-strictweakorder": "strict-weak-order",
  "a-count-semiorder": "semiorder",
  "a-count-semitransorder": "semitransitive-order",
  "a-count-seriesparallel": "series-parallel-order",
  "a-count-chainsorder": "strict-order non-branching-right non-branching-left",
  "a-count-earlyconfluent": "preorder early-confluent",
  "a-count-meetsemilattice": "meet-semilattice",
  "a-count-bottomposet": "partial-order least-element",
  "a-count-equivalence": "equivalence",
  "a-count-per": "partial-equivalence",
  "a-count-tournament": "tournament",
  "a-count-connex": "connex",
  "a-count-graph": "simple-graph",
  "a-count-tolerance": "tolerance",
  "a-count-graph_nouniv": "simple-graph serial no-universal-point",
  "a-count-trianglefree": "triangle-free-graph",
  "a-count-threshold": "threshold-graph",
  "a-count-matching1reg": "perfect-matching",
  "a-count-diam2": "simple-graph diameter-2",
  "a-count-friendship": "friendship-graph",
  "a-count-partialfunction": "partial-function",
  "a-count-permutation": "permutation",
  "a-count-partialperm": "partial-permutation",
  "a-count-derangement": "derangement",
  "a-count-idempfunction": "idempotent-function",
  "a-count-coreflexive": "coreflexive",
  "a-count-irrefl_bothserial": "irreflexive right-serial left-serial",
  "a-count-reuc": "right-euclidean",
  "a-count-K45": "transitive euclidean",
  "a-count-KD45": "serial transitive euclidean",
  "a-count-S4": "preorder",
  "a-count-antitransitive": "antitransitive",
  "a-count-quasitransitive": "quasi-transitive",
  "a-count-dense": "dense",
  "a-count-itrans": "incomparability-transitive",
  "a-count-so2": "semi-order-property-2",
  "a-count-confluent": "confluent",
  "a-count-quasireflexive": "quasi-reflexive",
  "a-count-lqr": "left-quasi-reflexive",
  "d-count-M": "ground-mereology",
  "d-count-M_WSP_MM": "minimal-mereology",
  "d-count-MM_PROD": "minimal-mereology binary-products",
  "d-count-EM_PROD": "extensional-mereology binary-products",
  "d-count-EM_SUM": "extensional-mereology binary-sums",
  "d-count-CEM": "closed-extensional-mereology",
  "d-count-MM_PPEXT": "minimal-mereology proper-part-extensionality",
  "d-count-M_PPEXT": "ground-mereology proper-part-extensionality",
  "d-count-M_atomless": "ground-mereology atomless",
  "d-count-MM_TOP": "minimal-mereology universe",
  "d-count-RF_TR_SSP": "preorder strong-supplementation",
};

describe("classes with published axioms", () => {
  test.each(Object.entries(CLASSES))("%s: %s", (id, names) => {
    const { axioms } = entryOf(id).statement as { axioms: string[] };
    expect(truthOn(sentenceOf(...names.split(" ")))).toBe(truthOn(and(...readSentences(axioms))));
  });
});

// Tables of independence in preference theory, parthood, orders (category e); sources in the entries.
const SETS: Readonly<Record<string, string>> = {
  equivalence: "equivalence",
  "partial order": "partial-order",
  "strict partial order": "strict-partial-order",
  "linear order": "total-order",
  "strict weak order": "strict-weak-order",
  "interval order": "interval-order",
  semiorder: "semiorder",
  "semiorder via ir,s1,s2": "semiorder",
  "total preorder": "total-preorder",
  function: "function",
  permutation: "permutation",
  "dense linear order without endpoints": "dense-linear-order-without-endpoints",
  "discrete order Z": "discrete-linear-order-without-endpoints",
  "mereology EM": "extensional-mereology",
  lattice: "lattice",
  "adjunctive set theory": "extensional empty-set adjunction",
};

describe("sets of axioms with tables of independence", () => {
  const tables = values.filter(({ id }) => id.startsWith("e-indep"));

  test.each(Object.entries(SETS))("%s: %s", (set, names) => {
    const entry = tables.find(({ statement }) => (statement as { set: string }).set === set);
    const { axioms } = entry!.statement as { axioms: Record<string, string> };
    expect(truthOn(sentenceOf(...names.split(" ")))).toBe(
      truthOn(and(...readSentences(Object.values(axioms)))),
    );
  });

  test("each axiom with a code", () => {
    let compared = 0;
    for (const { statement } of tables)
      for (const [code, text] of Object.entries((statement as { axioms: Record<string, string> }).axioms)) {
        const name = NAME_OF_CODE[code] ?? definitions[code]?.name.toLowerCase().replaceAll(" ", "-");
        if (name === undefined) continue;
        compared += 1;
        expect(truthOn(sentenceOf(name)), name).toBe(truthOn(and(...readSentences([text]))));
      }
    expect(compared).toBeGreaterThan(60);
  });
});

// Correspondence theory: van Benthem 1983; Blackburn, de Rijke and Venema 2001 (the check values, from memory).
describe("frame conditions of modal axioms", () => {
  test.each([
    ["c-corr-01", "reflexive"],
    ["c-corr-03", "symmetric"],
    ["c-corr-04", "transitive"],
    ["c-corr-06", "dense"],
    ["c-corr-07", "weakly-directed"],
    ["c-corr-09", "piecewise-connected"],
    ["c-corr-10", "functional"],
    ["c-corr-13", "empty"],
    ["c-corr-15", "coreflexive"],
    ["c-corr-19", "euclidean"],
    ["c-corr-23", "circular"],
  ])("%s: %s", (id, name) => {
    const [, condition] = (entryOf(id).statement as string).split("satisfies: ");
    expect(truthOn(sentenceOf(name))).toBe(truthOn(and(...readSentences([condition!]))));
  });
});

// Davey and Priestley 2002; Simons 1987: laws that tell apart what has no entry among the check values.
describe("textbook facts", () => {
  const isTrueOf = (name: string, size: number, ...pairs: string[]) =>
    isTrue(sentenceOf(name), size, new Map([["R", new Set(pairs)]]));

  test("directedness, bounds and joins", () => {
    // Two elements under a third, reflexive: every pair has an upper bound and a join, and no lower bound.
    const wedge = ["0,0", "1,1", "2,2", "0,2", "1,2"];
    for (const name of ["up-directed", "greatest-element", "binary-joins", "join-semilattice"])
      expect(isTrueOf(name, 3, ...wedge), name).toBe(true);
    for (const name of ["down-directed", "least-element", "binary-meets", "lattice", "bounded-order"])
      expect(isTrueOf(name, 3, ...wedge), name).toBe(false);
    expect(isTrueOf("bounded-order", 2, "0,0", "0,1", "1,1")).toBe(true);
  });

  test("parthood of two atoms and their sum", () => {
    const sum = ["0,0", "1,1", "2,2", "0,2", "1,2"];
    for (const name of ["atomistic", "overlap-extensionality", "binary-sums"])
      expect(isTrueOf(name, 3, ...sum), name).toBe(true);
    expect(isTrueOf("atomless", 3, ...sum)).toBe(false);
    // One proper part alone: they overlap the same things.
    expect(isTrueOf("overlap-extensionality", 2, "0,0", "1,1", "0,1")).toBe(false);
    expect(isTrueOf("atomistic", 2, "0,0", "0,1", "1,0", "1,1")).toBe(false);
  });

  test("functions", () => {
    expect(isTrueOf("involution", 3, "0,1", "1,0", "2,2")).toBe(true);
    expect(isTrueOf("involution", 3, "0,1", "1,2", "2,0")).toBe(false);
    // On finite sets an injection is a surjection (Dedekind 1888).
    expect(truthOn(sentenceOf("injection"))).toBe(truthOn(sentenceOf("surjection")));
  });
});

describe("the table", () => {
  test("gives each name once, in lower case with hyphens", () => {
    const names = namedProperties.flatMap(({ name, synonyms }) => [name, ...synonyms]);
    expect(new Set(names).size).toBe(names.length);
    expect(propertyNames).toEqual([...names].sort());
    for (const name of names) expect(name).toMatch(/^[a-z]+(-[a-z0-9]+)*$/);
  });

  test("has sentences about the relation alone, a meaning and a source", () => {
    for (const property of namedProperties) {
      const sentence = propertyOf(property, R);
      expect(freeVariables(sentence)).toEqual([]);
      expect(relationsOf(sentence)).toEqual([R]);
      expect(property.meaning).toMatch(/^[A-Z].*\.$/);
      expect(property.source).toMatch(/\b(1[89]|20)\d\d$/);
    }
  });

  test("holds different properties under different names", () => {
    // But for pairs that none of these relations tells apart: they differ on more points, or on infinitely many.
    const agreeing: string[] = [];
    const seen = new Map<string, string>();
    for (const property of namedProperties) {
      const truth = truthOn(propertyOf(property, R));
      const before = seen.get(truth);
      if (before !== undefined) agreeing.push(`${before} = ${property.name}`);
      seen.set(truth, property.name);
    }
    expect(agreeing).toMatchInlineSnapshot(`
      [
        "dense-linear-order-without-endpoints = discrete-linear-order-without-endpoints",
        "linear-order = lattice",
        "lattice = bounded-order",
        "injection = surjection",
        "surjection = permutation",
        "minimal-mereology = extensional-mereology",
      ]
    `);
  });
});
