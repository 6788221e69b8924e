/** What definitions may say on lines: truth of atoms, which offset and ends they need, and the mistakes. */
import fc from "fast-check";
import { describe, expect, it } from "vitest";
import { DenseLine } from "../lib/carriers/dense-line.ts";
import {
  denseLineVocabulary,
  halfLineVocabulary,
  integerLineVocabulary,
  neededEnds,
  neededOffset,
} from "../lib/carriers/vocabulary/lines.ts";
import type { CarrierAtom, ElementTerm } from "../lib/logic/structure-definition.ts";
import { lineAtoms } from "./support/carriers-arithmetic.ts";
import { halfLine, integerLine } from "./support/carriers-line-cases.ts";
import { whole } from "./support/carriers-lines.ts";

const seed = Number(process.env.TWOPLACE_SEED ?? 20261201);
const options = (numRuns: number) => ({ seed, numRuns, verbose: 1 as const });

const element = (variable: string, ...path: number[]): ElementTerm => ({ kind: "element", variable, path });
const shift = (of: ElementTerm, by: number): ElementTerm => ({ kind: "shift", of, by });
const number = (value: number): ElementTerm => ({ kind: "number", value });
const compare = (left: ElementTerm, relation: "=" | "<" | "≤", right: ElementTerm): CarrierAtom => ({
  kind: "compare",
  relation,
  left,
  right,
});
const colour = (of: ElementTerm, value: number): CarrierAtom => ({
  kind: "label",
  name: "colour",
  of,
  value,
});
const [x, y] = [element("x"), element("y")];
const place = (variable: string) => ["x", "y", "z"].indexOf(variable);

/** Truth of an atom by arithmetic on numbers. */
function isTrueOfNumbers(atom: CarrierAtom, values: Readonly<Record<string, number>>): boolean {
  if (atom.kind !== "compare") throw new Error("no arithmetic");
  const of = (term: ElementTerm): number => {
    if (term.kind === "element") return values[term.variable]!;
    if (term.kind === "number") return term.value;
    if (term.kind === "shift") return of(term.of) + term.by;
    throw new Error("no arithmetic");
  };
  const [left, right] = [of(atom.left), of(atom.right)];
  return { "=": left === right, "<": left < right, "≤": left <= right }[atom.relation];
}

describe("atoms on whole numbers", () => {
  const lines = ["integers", "naturals"] as const;
  const cases = fc
    .constantFrom(...lines)
    .chain((line) => fc.tuple(fc.constant(line), lineAtoms(line, ["x", "y"], 4)));
  const pairs = whole(0, 14).flatMap((a) => whole(0, 14).map((b) => [a, b] as const));
  const carrierOf = (line: (typeof lines)[number], offset: number, ends: number) =>
    line === "integers" ? integerLine(offset) : halfLine(offset, ends);
  const vocabularyOf = (line: (typeof lines)[number], offset: number, ends: number) =>
    line === "integers"
      ? integerLineVocabulary(integerLine(offset))
      : halfLineVocabulary(halfLine(offset, ends));

  it("are true when they are in arithmetic, also of configurations that have been cut", () => {
    fc.assert(
      fc.property(cases, fc.nat(2), fc.nat(2), ([line, atom], more, further) => {
        const [offset, ends] = [neededOffset([atom]) + more, neededEnds([atom]) + further];
        const vocabulary = vocabularyOf(line, offset, ends);
        const carrier = carrierOf(line, offset, ends);
        const examples = carrier.kindExamples(2);
        for (const [a, b] of pairs) {
          const expected = isTrueOfNumbers(atom, { x: a, y: b });
          const configuration = { positions: [a, b] };
          expect(vocabulary.holds(atom, configuration, place)).toBe(expected);
          const example = examples[carrier.kindOf(configuration, [0, 1])]!;
          expect(vocabulary.holds(atom, example, place), JSON.stringify({ atom, a, b })).toBe(expected);
        }
      }),
      options(150),
    );
  });

  it("need the least offset and ends with which kinds decide them, and are complained of with less", () => {
    fc.assert(
      fc.property(cases, ([line, atom]) => {
        const [offset, ends] = [neededOffset([atom]), neededEnds([atom])];
        const isDecided = (lessOffset: number, lessEnds: number): boolean => {
          const carrier = carrierOf(line, lessOffset, lessEnds);
          const truths = new Map<number, boolean>();
          return pairs.every(([a, b]) => {
            const kind = carrier.kindOf({ positions: [a, b] }, [0, 1]);
            const truth = isTrueOfNumbers(atom, { x: a, y: b });
            const same = (truths.get(kind) ?? truth) === truth;
            truths.set(kind, truth);
            return same;
          });
        };
        expect(isDecided(offset, ends)).toBe(true);
        expect(vocabularyOf(line, offset, ends).complaint(atom)).toBeNull();
        if (offset > 0) {
          expect(isDecided(offset - 1, ends)).toBe(false);
          expect(vocabularyOf(line, offset - 1, ends).complaint(atom)?.message).toContain(
            "differences up to",
          );
        }
        if (ends > 0) {
          expect(isDecided(offset, ends - 1)).toBe(false);
          expect(vocabularyOf(line, offset, ends - 1).complaint(atom)?.message).toContain("numbers");
        }
      }),
      options(150),
    );
  });

  it("need what they all need together, and nothing for what is no matter of steps", () => {
    const atoms = [
      compare(shift(x, 2), "=", y),
      compare(shift(x, 4), "≤", y),
      compare(x, "<", number(7)),
      colour(x, 9),
    ];
    expect(neededOffset(atoms)).toBe(3);
    expect(neededEnds(atoms)).toBe(7);
    expect([neededOffset([]), neededEnds([])]).toEqual([0, 0]);
    expect(neededOffset([compare(x, "<", shift(x, 100))])).toBe(0);
    expect(neededEnds([compare(x, "=", number(-1))])).toBe(0);
    // Components of one element are elements of their own.
    expect(neededOffset([compare(element("x", 1), "=", shift(element("x", 2), 5))])).toBe(5);
  });
});

describe("atoms that tell kinds apart", () => {
  const vectors = (atoms: readonly CarrierAtom[], isTrue: (atom: CarrierAtom) => boolean) =>
    atoms.map((atom) => Number(isTrue(atom))).join("");

  it.each([
    [1, 2],
    [2, 2],
    [3, 3],
  ])("do so on the dense line in %i colours for %i elements", (colours, length) => {
    const carrier = new DenseLine({ kind: "dense-line", colours });
    const vocabulary = denseLineVocabulary(carrier);
    const atoms = vocabulary.atoms(["x", "y", "z"].slice(0, length));
    for (const atom of atoms) expect(vocabulary.complaint(atom)).toBeNull();
    const told = carrier
      .kindExamples(length)
      .map((one) => vectors(atoms, (atom) => vocabulary.holds(atom, one, place)));
    expect(new Set(told).size).toBe(carrier.kindCount(length));
  });

  it.each([
    [integerLine(0), 2],
    [integerLine(2), 2],
    [integerLine(1), 3],
    [halfLine(0, 0), 1],
    [halfLine(1, 3), 1],
    [halfLine(1, 0), 2],
    [halfLine(0, 4), 2],
    [halfLine(1, 2), 3],
  ])("do so on lines of whole numbers", (carrier, length) => {
    const { description } = carrier;
    const vocabulary =
      description.kind === "integer-line"
        ? integerLineVocabulary(integerLine(description.offset))
        : halfLineVocabulary(halfLine(description.offset, description.ends));
    const atoms = vocabulary.atoms(["x", "y", "z"].slice(0, length));
    for (const atom of atoms) expect(vocabulary.complaint(atom)).toBeNull();
    const told = carrier
      .kindExamples(length)
      .map((one) => vectors(atoms, (atom) => vocabulary.holds(atom, one, place)));
    expect(new Set(told).size).toBe(carrier.kindCount(length));
  });

  it("come simplest first", () => {
    expect(integerLineVocabulary(integerLine(1)).atoms(["x", "y"])).toEqual([
      compare(x, "<", y),
      compare(y, "<", x),
      compare(x, "=", y),
      compare(y, "=", shift(x, 1)),
      compare(x, "=", shift(y, 1)),
      compare(shift(x, 2), "≤", y),
      compare(shift(y, 2), "≤", x),
    ]);
    expect(halfLineVocabulary(halfLine(0, 2)).atoms(["x"])).toEqual([
      compare(x, "=", number(0)),
      compare(x, "=", number(1)),
      compare(number(1), "<", x),
    ]);
    expect(denseLineVocabulary(new DenseLine({ kind: "dense-line", colours: 2 })).atoms(["x"])).toEqual([
      colour(x, 1),
      colour(x, 2),
    ]);
  });

  it("tell colours", () => {
    const vocabulary = denseLineVocabulary(new DenseLine({ kind: "dense-line", colours: 3 }));
    const configuration = { ranks: [1, 0], colours: [2, 0] };
    expect(vocabulary.holds(colour(x, 3), configuration, place)).toBe(true);
    expect(vocabulary.holds(colour(y, 3), configuration, place)).toBe(false);
    expect(vocabulary.holds(colour(y, 1), configuration, place)).toBe(true);
    expect(vocabulary.holds(compare(y, "<", x), configuration, place)).toBe(true);
    expect(vocabulary.holds(compare(x, "≤", y), configuration, place)).toBe(false);
  });
});

describe("complaints", () => {
  const dense = denseLineVocabulary(new DenseLine({ kind: "dense-line", colours: 1 }));
  const coloured = denseLineVocabulary(new DenseLine({ kind: "dense-line", colours: 2 }));
  const integer = integerLineVocabulary(integerLine(1));
  const half = halfLineVocabulary(halfLine(1, 2));
  const copy: CarrierAtom = { kind: "label", name: "copy", of: x, value: 1 };
  const arc: CarrierAtom = { kind: "holds", name: "arc", args: [x, y] };
  const meet: ElementTerm = { kind: "apply", name: "meet", args: [x, y] };

  it.each([
    [
      dense,
      compare(y, "=", shift(x, 1)),
      "the rational line has no next elements, so `x + 1` says nothing there",
    ],
    [
      dense,
      compare(shift(x, -2), "<", y),
      "the rational line has no next elements, so `x - 2` says nothing there",
    ],
    [
      dense,
      compare(x, "<", number(3)),
      "the rational line looks the same from every element, so the number 3 says nothing there",
    ],
    [dense, colour(x, 1), "this rational line has one colour only"],
    [coloured, colour(x, 3), "this rational line has the colours 1 to 2, and no 3"],
    [coloured, colour(x, 0), "this rational line has the colours 1 to 2, and no 0"],
    [
      coloured,
      colour(number(1), 1),
      "the rational line looks the same from every element, so the number 1 says nothing there",
    ],
    [dense, copy, "the rational line has no copies"],
    [dense, arc, "`arc` says nothing on the rational line"],
    [dense, compare(meet, "=", x), "`meet` says nothing on the rational line"],
    [dense, compare(element("x", 1), "<", y), "the elements of the rational line have no components"],
    [
      integer,
      compare(x, "=", number(0)),
      "the integer line looks the same from every element, so `x = 0` says nothing there",
    ],
    [
      integer,
      compare(shift(number(1), 1), "≤", x),
      "the integer line looks the same from every element, so `1 + 1 ≤ x` says nothing there",
    ],
    [
      integer,
      compare(shift(x, 3), "≤", y),
      "this line tells differences up to 1 apart, and `x + 3 ≤ y` needs those up to 2",
    ],
    [integer, colour(x, 1), "the integer line has no colours"],
    [integer, compare(x, "=", element("y", 2)), "the elements of the integer line have no components"],
    [
      half,
      compare(x, "<", number(3)),
      "this half line tells its first 2 numbers apart, and `x < 3` needs the first 3",
    ],
    [half, compare(x, "=", number(-1)), "the half line begins with 0, so it has no -1"],
    [half, compare(number(1), "<", number(2)), "`1 < 2` says nothing of an element"],
    [half, arc, "`arc` says nothing on the half line"],
    [half, compare(meet, "=", x), "`meet` says nothing on the half line"],
  ])("%#", (vocabulary, atom, message) => {
    const complaint = vocabulary.complaint(atom);
    expect(complaint?.message).toBe(message);
    if (complaint?.suggestion != null) expect(complaint.suggestion).not.toMatch(/\.$/);
  });

  it("are not made of what says something", () => {
    expect(dense.complaint(compare(x, "≤", y))).toBeNull();
    expect(coloured.complaint(colour(x, 2))).toBeNull();
    expect(integer.complaint(compare(shift(x, 2), "≤", y))).toBeNull();
    expect(integer.complaint(compare(shift(shift(x, 2), -1), "=", y))).toBeNull();
    expect(half.complaint(compare(shift(x, 3), "≤", number(4)))).toBeNull();
    expect(half.complaint(compare(x, "=", shift(y, -1)))).toBeNull();
  });
});
