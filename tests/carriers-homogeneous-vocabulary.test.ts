/** What definitions may say of homogeneous carriers: its truth in samples that are built another way, and complaints. */
import fc from "fast-check";
import { describe, expect, it } from "vitest";
import type { CarrierAtom, ElementTerm } from "../lib/logic/structure-definition.ts";
import {
  algebraCases,
  algebraWithoutEnds,
  cases,
  fullAlgebra,
  genericCases,
  locate,
} from "./support/homogeneous-cases.ts";
import { tuplesOf } from "./support/homogeneous-samples.ts";

const seed = Number(process.env.TWOPLACE_SEED ?? 20261201);
const options = (numRuns: number) => ({ seed, numRuns, verbose: 1 as const });

const variables = ["x", "y", "z"];
const element = (variable: string, ...path: (number | "outer" | "inner")[]): ElementTerm => ({
  kind: "element",
  variable,
  path,
});
const number = (value: number): ElementTerm => ({ kind: "number", value });
const apply = (name: "meet" | "join" | "co" | "parent", ...args: ElementTerm[]): ElementTerm => ({
  kind: "apply",
  name,
  args,
});
const compare = (left: ElementTerm, relation: "=" | "<" | "≤", right: ElementTerm): CarrierAtom => ({
  kind: "compare",
  relation,
  left,
  right,
});
const holds = (name: "adjacent" | "arc" | "beats", ...args: ElementTerm[]): CarrierAtom => ({
  kind: "holds",
  name,
  args,
});
const [x, y, z] = variables.map((variable) => element(variable)) as [ElementTerm, ElementTerm, ElementTerm];

function write(term: ElementTerm): string {
  if (term.kind === "element") return term.variable;
  if (term.kind === "number") return String(term.value);
  return term.kind === "apply" ? `${term.name}(${term.args.map(write).join(", ")})` : "?";
}
function writeAtom(atom: CarrierAtom): string {
  if (atom.kind === "compare") return `${write(atom.left)} ${atom.relation} ${write(atom.right)}`;
  return atom.kind === "holds" ? `${atom.name}(${atom.args.map(write).join(", ")})` : "?";
}

describe("truth", () => {
  const relationNames = ["=", "<", "≤"] as const;

  it.each(genericCases)(`$name (seed ${seed})`, (which) => {
    const sample = which.sampleOf(3);
    const tuples = tuplesOf(sample, 3);
    const name = { graph: "adjacent", digraph: "arc", tournament: "beats", "partial-order": null }[
      which.name
    ] as "arc" | null;
    const relation = name === null ? fc.constantFrom(...relationNames) : fc.constantFrom("=" as const, name);
    const place = fc.nat(2);
    fc.assert(
      fc.property(fc.nat(tuples.length - 1), relation, place, place, (index, said, i, j) => {
        const tuple = tuples[index]!;
        const [left, right] = [element(variables[i]!), element(variables[j]!)];
        const atom =
          name !== null && said !== "=" ? holds(name, left, right) : compare(left, said as "=", right);
        expect(which.vocabulary.complaint(atom)).toBeNull();
        const signature = sample.signature([tuple[i]!, tuple[j]!]);
        const isSame = signature === "2:=";
        const isArc = signature === "2:1" || signature === "2:3";
        const expected = said === "=" ? isSame : said === "≤" ? isSame || isArc : isArc;
        const configuration = locate(which, sample, tuple);
        expect(which.vocabulary.holds(atom, configuration, (v) => variables.indexOf(v))).toBe(expected);
      }),
      options(300),
    );
  });

  const { term } = fc.letrec<{ term: ElementTerm }>((tie) => ({
    term: fc.oneof(
      { maxDepth: 3, depthIdentifier: "term" },
      fc.constantFrom(x, y, z, x, y, z, number(0), number(1)),
      fc
        .tuple(fc.constantFrom("meet" as const, "join" as const), tie("term"), tie("term"))
        .map(([name, a, b]) => apply(name, a, b)),
      tie("term").map((a) => apply("co", a)),
    ),
  }));
  /** The whole of a sample. */
  const ALL = 2 ** 16 - 1;

  it.each(algebraCases)(`$name (seed ${seed})`, (which) => {
    const sample = which.sampleOf(3);
    const tuples = tuplesOf(sample, 3) as (readonly number[])[];
    const order = fc.constantFrom([0, 1, 2], [2, 0, 1], [1, 1, 0]);
    let holding = 0;
    fc.assert(
      fc.property(
        fc.nat(tuples.length - 1),
        order,
        fc.constantFrom(...relationNames),
        term,
        term,
        (index, places, relation, left, right) => {
          const tuple = tuples[index]!;
          const place = (variable: string) => places[variables.indexOf(variable)]!;
          const value = (part: ElementTerm): number => {
            if (part.kind === "element") return tuple[place(part.variable)]!;
            if (part.kind === "number") return part.value === 1 ? ALL : 0;
            const args = (part as { args: readonly ElementTerm[] }).args.map(value);
            const name = (part as { name: string }).name;
            return name === "co"
              ? ALL - args[0]!
              : name === "meet"
                ? args[0]! & args[1]!
                : args[0]! | args[1]!;
          };
          const [a, b] = [value(left), value(right)];
          const expected = relation === "=" ? a === b : (a & b) === a && (relation === "≤" || a !== b);
          if (expected) holding += 1;
          const atom = compare(left, relation, right);
          expect(which.vocabulary.holds(atom, locate(which, sample, tuple), place)).toBe(expected);
        },
      ),
      options(400),
    );
    expect(holding).toBeGreaterThan(40);
    expect(holding).toBeLessThan(360);
  });
});

describe("atoms", () => {
  it.each(cases)("$name: say something, and tell all kinds apart", ({ carrier, vocabulary }) => {
    for (const length of [1, 2, 3]) {
      const named = variables.slice(0, length);
      const atoms = vocabulary.atoms(named);
      expect(atoms.filter((atom) => vocabulary.complaint(atom) !== null)).toEqual([]);
      expect(new Set(atoms.map(writeAtom)).size).toBe(atoms.length);
      const place = (variable: string) => named.indexOf(variable);
      const profiles = carrier
        .kindExamples(length)
        .map((example) => atoms.map((atom) => (vocabulary.holds(atom, example, place) ? "1" : "0")).join(""));
      expect(new Set(profiles).size).toBe(carrier.kindCount(length));
      // Each says something: it is true of some and false of others.
      for (const [index] of atoms.entries())
        expect(new Set(profiles.map((profile) => profile[index])).size).toBe(2);
    }
  });

  it.each([
    ["graph", ["adjacent(x, y)", "x = y"]],
    ["digraph", ["arc(x, y)", "arc(y, x)", "x = y"]],
    ["tournament", ["beats(x, y)", "beats(y, x)", "x = y"]],
    ["partial-order", ["x < y", "y < x", "x ≤ y", "y ≤ x", "x = y"]],
    [
      "Boolean algebra",
      [
        "x = 0",
        "x = 1",
        "y = 0",
        "y = 1",
        "x < y",
        "y < x",
        "x ≤ y",
        "y ≤ x",
        "x = y",
        "meet(x, y) = 0",
        "join(x, y) = 1",
      ],
    ],
    [
      "Boolean algebra without zero",
      ["x = 1", "y = 1", "x < y", "y < x", "x ≤ y", "y ≤ x", "x = y", "meet(x, y) = 0", "join(x, y) = 1"],
    ],
    ["Boolean algebra without zero and top", ["x < y", "y < x", "x ≤ y", "y ≤ x", "x = y", "meet(x, y) = 0"]],
  ])("%s: of two elements", (name, expected) => {
    const { vocabulary } = cases.find((which) => which.name === name)!;
    expect(vocabulary.atoms(["x", "y"]).map(writeAtom)).toEqual(expected);
  });

  it("of three elements of a Boolean algebra: all cells", () => {
    const written = fullAlgebra.vocabulary.atoms(variables).map(writeAtom);
    for (const cell of [
      "x ≤ join(y, z)",
      "meet(x, z) ≤ y",
      "meet(meet(x, y), z) = 0",
      "join(join(x, y), z) = 1",
    ])
      expect(written).toContain(cell);
    expect(
      algebraWithoutEnds.vocabulary
        .atoms(variables)
        .map(writeAtom)
        .filter((text) => text.endsWith("= 1")),
    ).toEqual([]);
  });
});

describe("complaints", () => {
  const wrongIn = (name: string, atom: CarrierAtom) =>
    cases.find((which) => which.name === name)!.vocabulary.complaint(atom);

  it.each([
    [
      "graph",
      compare(x, "<", y),
      "the generic graph has no order, so `x < y` says nothing there",
      "`adjacent(x, y)`",
    ],
    [
      "digraph",
      compare(x, "≤", y),
      "the generic digraph has no order, so `x ≤ y` says nothing there",
      "`arc(x, y)`",
    ],
    ["tournament", holds("arc", y, x), "`arc` says nothing in the generic tournament", "`beats(y, x)`"],
    ["partial-order", holds("beats", x, y), "`beats` says nothing in the generic partial order", "`x < y`"],
    ["graph", holds("adjacent", x), "`adjacent` is said of two elements, and not of 1", "`adjacent(x, y)`"],
    [
      "graph",
      compare(x, "=", number(0)),
      "the generic graph has no number 0",
      "elements alone, as in `adjacent(x, y)`",
    ],
    [
      "partial-order",
      compare({ kind: "shift", of: x, by: 1 }, "=", y),
      "the generic partial order has no steps from an element to the next",
      "`x < y`",
    ],
    [
      "partial-order",
      compare(apply("meet", x, y), "=", z),
      "`meet` says nothing in the generic partial order",
      "a tree or a Boolean algebra, where it is defined",
    ],
    [
      "digraph",
      holds("arc", apply("parent", x), y),
      "`parent` says nothing in the generic digraph",
      "a forest, where it is defined",
    ],
    [
      "tournament",
      compare(element("x", 1), "=", y),
      "the elements of the generic tournament have no components",
      "`x` itself",
    ],
    [
      "graph",
      { kind: "label", name: "colour", of: x, value: 1 },
      "the generic graph has no colours",
      "`adjacent(x, y)`",
    ],
    [
      "Boolean algebra",
      { kind: "label", name: "part", of: x, value: 1 },
      "a Boolean algebra has no parts",
      "`x ≤ y`",
    ],
    ["Boolean algebra", holds("adjacent", x, y), "`adjacent` says nothing in a Boolean algebra", "`x ≤ y`"],
    [
      "Boolean algebra",
      compare(x, "=", number(2)),
      "a Boolean algebra has the numbers 0 and 1 only, and no 2",
      "`0` or `1`",
    ],
    [
      "Boolean algebra",
      compare(apply("join", x, { kind: "shift", of: y, by: 1 }), "=", z),
      "a Boolean algebra has no steps from an element to the next",
      "`join(x, y)`",
    ],
    [
      "Boolean algebra",
      compare(apply("parent", x), "=", y),
      "the elements of a Boolean algebra have no parents",
      "a forest, where elements have parents",
    ],
    [
      "Boolean algebra",
      compare(apply("meet", x), "=", y),
      "`meet` takes two terms, and not 1",
      "`meet(x, y)`",
    ],
    ["Boolean algebra", compare(apply("co", x, y), "=", y), "`co` takes one term, and not 2", "`co(x)`"],
    [
      "Boolean algebra",
      compare(element("x", "outer"), "≤", y),
      "the elements of a Boolean algebra have no components",
      "`x` itself",
    ],
    [
      "Boolean algebra",
      compare(number(0), "≤", number(1)),
      "`0 ≤ 1` says nothing of an element",
      "`x = 0`, of an element",
    ],
  ] as const)("%s: %#", (name, atom, message, suggestion) => {
    expect(wrongIn(name, atom)).toEqual({ message, suggestion });
  });

  it("none about zero, top and complements where they are not elements", () => {
    for (const atom of [
      compare(apply("meet", x, y), "=", number(0)),
      compare(apply("co", x), "≤", y),
      compare(x, "<", number(1)),
    ])
      for (const { vocabulary } of algebraCases) expect(vocabulary.complaint(atom)).toBeNull();
  });
});
