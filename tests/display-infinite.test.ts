/** Infinite structures as people read them: samples that do not mislead, kinds of pairs, definitions, in every form. */
import fc from "fast-check";
import { beforeAll, describe, expect, it } from "vitest";
import { showAnswer } from "../kernel/display/answers.ts";
import { dataOf } from "../kernel/display/data.ts";
import { showDefinition, showDescription } from "../kernel/display/definitions.ts";
import { prepareDrawing } from "../kernel/display/drawing.ts";
import { inlineStructure } from "../kernel/display/inline.ts";
import { kindTable } from "../kernel/display/kinds.ts";
import { drawSample } from "../kernel/display/sample-drawing.ts";
import { relationOn } from "../kernel/display/sample-relations.ts";
import { sampleOf } from "../kernel/display/samples.ts";
import { domainOf, structureBlocks } from "../kernel/display/structures.ts";
import { drawTerms } from "../kernel/display/term-samples.ts";
import { blocksToText, inlineToText } from "../kernel/display/to-text.ts";
import { buildCarrier } from "../lib/carriers/build.ts";
import { definedTable } from "../lib/carriers/defined.ts";
import { kindExamplesOf } from "../lib/carriers/kind-examples.ts";
import type { Structure } from "../lib/carriers/structure.ts";
import { CARRIERS } from "../lib/inquiry/carrier-list.ts";
import type { CarrierDescription } from "../lib/logic/structure-definition.ts";
import { checkBundle } from "./support/bundles.ts";
import {
  claimAnswer,
  conclusion,
  deep,
  entails,
  evidence,
  found,
  order,
  R,
  searched,
  stated,
} from "./support/display-fixtures.ts";
import { definedStructure, readDefinition } from "./support/infinite-fixtures.ts";
import { readMarkup } from "./support/markup.ts";
import { findOverlaps } from "./support/picture-geometry.ts";

const seed = Number(process.env.TWOPLACE_SEED ?? 20261201);

beforeAll(prepareDrawing);

/** A structure on a carrier with R where a table has it. */
function tabled(description: CarrierDescription, holds: (kind: number) => boolean): Structure {
  const carrier = buildCarrier(description);
  const table = Uint8Array.from({ length: carrier.kindCount(2) }, (_, kind) => (holds(kind) ? 1 : 0));
  return { carrier, tables: new Map([[R.name, { relation: R, holds: table }]]) };
}

describe("samples", () => {
  it("have elements of the carrier that are all different, with names that are", () => {
    for (const description of CARRIERS) {
      const carrier = buildCarrier(description);
      const sample = sampleOf(carrier, 4)!;
      const count = sample.elements.length;
      expect(count).toBeGreaterThan(2);
      expect(new Set(sample.elements.map(({ name }) => name)).size).toBe(count);
      for (let one = 0; one < count; one += 1)
        for (let other = 0; other < count; other += 1)
          expect(
            carrier.same(sample.configuration, one, other),
            domainOf({ carrier, tables: new Map() }),
          ).toBe(one === other);
      // What is beside the sample is listed as beside any configuration.
      for (const extended of carrier.extensions(sample.configuration, 0))
        expect(carrier.kindOf(extended, [0, 1])).toBe(carrier.kindOf(sample.configuration, [0, 1]));
    }
  });

  const number = (name: string) => Number(name.replace("−", "-"));
  const letter = (name: string) => "abcdefghi".indexOf(name[0]!);
  const digit = (name: string) => "₀₁₂₃".indexOf(name.at(-1)!);
  const pair = (name: string) => /^\((.*),(.*)\)$/.exec(name)!.slice(1) as [string, string];
  const algebra = new Map([["0", 0], ["x∖y", 1], ["y∖x", 2], ["x∧y", 4], ["x", 5], ["y", 6], ["x∨y", 7], ["1", 15]]); // biome-ignore format: a list
  const partOf = (x: string, y: string) => (algebra.get(x)! & ~algebra.get(y)!) === 0;
  const parents = new Map([["a", "0"], ["b", "0"], ["c", "a"], ["d", "a"], ["e", "b"], ["f", "b"]]); // biome-ignore format: a list

  /** By what their names say, worked out here. */
  const meanings: readonly (readonly [string, (x: string, y: string) => boolean])[] = [
    ["dense-line where Rxy iff x < y", (x, y) => letter(x) < letter(y)],
    ["half-line where Rxy iff y = x + 2 or x = 0", (x, y) => number(y) === number(x) + 2 || number(x) === 0],
    ["integer-line where Rxy iff x + 3 <= y", (x, y) => number(x) + 3 <= number(y)],
    [
      "2 copies of dense-line where Rxy iff x.1 < y.1 and copy(x) = 2",
      (x, y) => letter(x) < letter(y) && digit(x) === 2,
    ],
    [
      "2 copies of integer-line where Rxy iff y.1 = x.1 + 1",
      (x, y) => number(y.slice(0, -1)) === number(x.slice(0, -1)) + 1,
    ],
    [
      "1 copy of half-line with 1 point where Rxy iff x.1 < y.1 or copy(y) = 2",
      (x, y) => y === "p" || (x !== "p" && number(x) < number(y)),
    ],
    [
      "tuples of 2 over dense-line where Rxy iff x.2 < y.1",
      (x, y) => letter(pair(x)[1]) < letter(pair(y)[0]),
    ],
    [
      "integer-line at each point of dense-line where Rxy iff x.outer < y.outer or x.outer = y.outer and x.inner < y.inner",
      (x, y) =>
        pair(x)[0] < pair(y)[0] || (pair(x)[0] === pair(y)[0] && number(pair(x)[1]) < number(pair(y)[1])),
    ],
    [
      "sum of half-line and integer-line where Rxy iff x < y or part(x) = 1 and part(y) = 2",
      (x, y) =>
        digit(x) < digit(y) || (digit(x) === digit(y) && number(x.slice(0, -1)) < number(y.slice(0, -1))),
    ],
    ["boolean-algebra where Rxy iff x <= y", partOf],
    ["boolean-algebra without zero and top where Rxy iff x < y", (x, y) => x !== y && partOf(x, y)],
    [
      "boolean-algebra without zero where Rxy iff meet(x, y) != 0",
      (x, y) => (algebra.get(x)! & algebra.get(y)!) !== 0,
    ],
    ["rooted tree with 2 children where Rxy iff parent(x) = y", (x, y) => parents.get(x) === y],
    ["dense-tree where Rxy iff x < y", (x, y) => ["ab", "ac", "ad", "ae", "bd", "be"].includes(x + y)],
  ];

  it.each(meanings)("mean what their names say: %s", (text, holds) => {
    const structure = definedStructure(text);
    const sample = sampleOf(structure.carrier, 4)!;
    const { matrix } = relationOn(structure, structure.tables.get("R")!, sample)!;
    const elements = sample.elements.map(({ name }) => name);
    expect(matrix).toEqual(elements.map((x) => elements.map((y) => holds(x, y))));
    expect(matrix.flat()).toContain(true);
    expect(matrix.flat()).toContain(false);
  });
});

/** A domain as numbers, in a window that is large enough to see all that can stand to a sample. */
interface Window<Element> {
  readonly carrier: CarrierDescription;
  readonly elements: readonly Element[];
  /** Those of the sample, in its order. */
  readonly sample: readonly Element[];
  /** A name of how two elements stand to each other, by which the relation is defined. */
  readonly kind: (x: Element, y: Element) => string;
  /** The elements of a configuration of two. */
  readonly read: (configuration: never) => readonly [Element, Element];
}

const range = (from: number, to: number, step = 1) =>
  Array.from({ length: Math.round((to - from) / step) + 1 }, (_, index) => from + step * index);
const cut = (value: number, most: number) => Math.max(-most, Math.min(most, value));

const windows: readonly Window<never>[] = [
  {
    carrier: { kind: "dense-line", colours: 1 },
    elements: range(0.5, 4.5, 0.5),
    sample: [1, 2, 3, 4],
    kind: (x: number, y: number) => `${Math.sign(y - x)}`,
    read: ({ ranks }: { ranks: [number, number] }) => ranks,
  } satisfies Window<number>,
  {
    carrier: { kind: "integer-line", offset: 1 },
    elements: range(-12, 12),
    sample: range(-2, 2),
    kind: (x: number, y: number) => `${cut(y - x, 2)}`,
    read: ({ positions }: { positions: [number, number] }) => positions,
  } satisfies Window<number>,
  {
    carrier: { kind: "half-line", offset: 1, ends: 2 },
    elements: range(0, 20),
    sample: range(0, 3),
    kind: (x: number, y: number) => `${cut(y - x, 2)},${Math.min(x, 2)},${Math.min(y, 2)}`,
    read: ({ positions }: { positions: [number, number] }) => positions,
  } satisfies Window<number>,
  {
    carrier: { kind: "tuples", over: { kind: "dense-line", colours: 1 }, widths: [1, 1] },
    elements: [0, 1].flatMap((tag) => range(0.5, 3.5, 0.5).map((place) => [tag, place] as const)),
    sample: [0, 1].flatMap((tag) => [1, 2, 3].map((place) => [tag, place] as const)),
    kind: (x: readonly [number, number], y: readonly [number, number]) =>
      `${x[0]},${y[0]},${Math.sign(y[1] - x[1])}`,
    read: ({ tags, base }: { tags: [number, number]; base: { ranks: [number, number] } }) => [
      [tags[0], base.ranks[0]] as const,
      [tags[1], base.ranks[1]] as const,
    ],
  } satisfies Window<readonly [number, number]>,
] as unknown as readonly Window<never>[];

describe("what is said of elements that are not drawn", () => {
  it.each(windows.map((window) => [window.carrier.kind, window] as const))(
    "is what they are in the structure itself: %s",
    (_, { carrier: description, elements, sample: own, kind, read }) => {
      const carrier = buildCarrier(description);
      const names = kindExamplesOf(carrier, 2).map((example) => kind(...read(example as never)));
      expect(new Set(names).size).toBe(names.length);
      fc.assert(
        fc.property(fc.array(fc.boolean(), { minLength: names.length, maxLength: names.length }), (holds) => {
          const structure = tabled(description, (number) => holds[number]!);
          const sample = sampleOf(structure.carrier, 4)!;
          const { others } = relationOn(structure, structure.tables.get("R")!, sample)!;
          const isRelated = (x: never, y: never) => holds[names.indexOf(kind(x, y))]!;
          const outside = elements.filter((one) => !own.some((other) => String(other) === String(one)));
          const expected = outside.map((one) =>
            JSON.stringify({
              from: own.map((mine) => isRelated(mine, one)),
              to: own.map((mine) => isRelated(one, mine)),
            }),
          );
          expect(new Set(others.map((other) => JSON.stringify(other)))).toEqual(new Set(expected));
        }),
        { seed, numRuns: 60 },
      );
    },
  );
});

/** How many lines of a picture are solid, dashed and dotted, and how many heads there are. */
function strokesOf(svg: string): readonly [number, number, number, number] {
  const { elements } = readMarkup(svg, []);
  const dashes = elements
    .filter(({ name }) => name === "path")
    .map(({ attributes }) => attributes.get("stroke-dasharray"));
  const count = (wanted: string | undefined) => dashes.filter((one) => one === wanted).length;
  return [
    count(undefined),
    count("6 3.5"),
    count("1.4 3.2"),
    elements.filter(({ name }) => name === "polygon").length,
  ];
}

describe("pictures", () => {
  it.each([
    ["dense-line where Rxy iff x < y", [0, 3, 2, 0]],
    ["dense-line where Rxy iff x <= y", [0, 3, 2, 0]],
    ["half-line where Rxy iff x < y", [3, 0, 1, 0]],
    ["half-line where Rxy iff y < x", [3, 0, 1, 0]],
    ["integer-line where Rxy iff x < y", [4, 0, 2, 0]],
    [
      "integer-line at each point of dense-line where Rxy iff x.outer < y.outer or x.outer = y.outer and x.inner < y.inner",
      [4, 1, 2, 0],
    ],
    [
      "half-line at each point of half-line where Rxy iff x.outer < y.outer or x.outer = y.outer and x.inner < y.inner",
      [4, 1, 1, 0],
    ],
    ["sum of half-line and integer-line where Rxy iff x < y or part(x) = 1 and part(y) = 2", [4, 1, 1, 0]],
    [
      "1 copy of dense-line with 1 point where Rxy iff x.1 < y.1 or copy(x) = 2 and copy(y) = 1",
      [0, 4, 1, 0],
    ],
    ["2 copies of dense-line where Rxy iff x.1 < y.1 and copy(x) = copy(y)", [0, 4, 4, 0]],
    ["boolean-algebra where Rxy iff x <= y", [0, 10, 0, 0]],
    ["dense-tree where Rxy iff x < y", [0, 4, 6, 0]],
    ["generic partial-order where Rxy iff x < y", [0, 4, 10, 0]],
    ["half-line where Rxy iff y = x + 1", [3, 0, 1, 4]],
    ["integer-line where Rxy iff y = x + 1", [4, 0, 2, 6]],
    ["integer-line where Rxy iff y = x + 1 or x = y + 1", [4, 0, 2, 0]],
    ["rooted tree with 2 children where Rxy iff parent(x) = y", [6, 0, 4, 10]],
    ["tree with 2 children where Rxy iff parent(x) = y", [6, 0, 5, 11]],
    ["generic graph where Rxy iff adjacent(x, y)", [5, 0, 0, 0]],
  ])("say how the order or the arrows go on: %s", (text, strokes) => {
    const { svg, caption } = drawSample(definedStructure(text))!;
    expect(strokesOf(svg)).toEqual(strokes);
    expect(findOverlaps(svg)).toEqual([]);
    const [, dashed, dotted] = strokes as [number, number, number];
    expect(/dashed: others lie between/.test(caption)).toBe(dashed > 0);
    expect(/dotted: /.test(caption)).toBe(dotted > 0);
    expect(caption).toMatch(/^a sample: \d of infinitely many elements; /);
  });

  it.each([
    ["dense-line where Rxy iff x = y", 5, "dots: others, also in further frames"],
    [
      "points 2 at each point of dense-line where Rxy iff x.outer = y.outer",
      4,
      "dots: others, also in further frames",
    ],
    ["dense-line in 2 colours where Rxy iff colour(x) = 1 <-> colour(y) = 1", 2, "dots: others"],
    ["half-line where Rxy iff x = y or not x = 0 and not y = 0", 2, "dots: others"],
  ])("frame classes, with dots for what is not drawn: %s", (text, frames, remark) => {
    const { svg, caption } = drawSample(definedStructure(text))!;
    const { elements, text: words } = readMarkup(svg, []);
    expect(
      elements.filter(({ name, attributes }) => name === "rect" && attributes.get("fill") === "none"),
    ).toHaveLength(frames);
    expect(words).toContain("…");
    expect(caption.endsWith(remark)).toBe(true);
    expect(findOverlaps(svg)).toEqual([]);
  });

  it("say it when the relation holds of nothing, and of everything", () => {
    const draw = (holds: boolean) => drawSample(tabled({ kind: "dense-line", colours: 1 }, () => holds))!;
    expect(draw(false).caption).toContain("R holds of no pair");
    expect(strokesOf(draw(false).svg)).toEqual([0, 0, 0, 0]);
    expect(draw(true).caption).toContain("exactly when x and y stand in one frame; dots: others");
  });

  it("merge what a preorder does not tell apart", () => {
    const { svg, caption } = drawSample(definedStructure("2 copies of dense-line where Rxy iff x.1 <= y.1"))!;
    expect(readMarkup(svg, []).text).toContain("a₁, a₂");
    expect(caption).toContain("in one outline: related both ways");
    const endless = drawSample(
      definedStructure("dense-line in 2 colours where Rxy iff colour(x) = 1 or colour(y) = 2"),
    );
    // Written below the names, colours would be lost: so it is drawn with arrows.
    expect(endless!.caption).toContain("an arrow from x to y");
  });

  it("have one-place relations at the points, and say what is not drawn", () => {
    const structure = definedStructure("half-line where Rxy iff x < y");
    const { carrier, tables } = structure;
    const isFirst = (kind: number) => (kind === 0 ? 1 : 0);
    const table = {
      relation: deep,
      holds: Uint8Array.from({ length: carrier.kindCount(1) }, (_, kind) => isFirst(kind)),
    };
    const { svg } = drawSample({ carrier, tables: new Map([...tables, ["Deep", table]]) })!;
    expect(readMarkup(svg, []).text).toContain("Deep");
    const two = definedStructure("dense-line where Rxy iff x < y, Sxy iff x = y", {
      declared: [R, { name: "S", places: 2, infix: false }],
      definitions: new Map(),
    });
    expect(drawSample(two)!.caption).toContain("R holds of these and others too");
  });

  it("are there for every carrier that is searched, whatever the relation is, and are the same each time", () => {
    fc.assert(
      fc.property(fc.constantFrom(...CARRIERS), fc.infiniteStream(fc.boolean()), (description, stream) => {
        const holds: boolean[] = [];
        const structure = tabled(description, (kind) => (holds[kind] ??= stream.next().value as boolean));
        const picture = drawSample(structure)!;
        expect(picture.alt).toMatch(/^Drawing of \d+ of infinitely many elements\. Among them R holds of /);
        expect(drawSample(structure)).toEqual(picture);
        expect(strokesOf(picture.svg).every((count) => count < 60)).toBe(true);
      }),
      { seed, numRuns: 80 },
    );
  });
});

describe("tables of kinds", () => {
  it("tell each kind of two elements apart, and say where the relation holds", () => {
    const carriers = CARRIERS.filter((description) => buildCarrier(description).kindCount(2) <= 30);
    expect(carriers.length).toBeGreaterThan(20);
    for (const [number, description] of carriers.entries()) {
      const structure = tabled(description, (kind) => (kind * 7 + number) % 3 === 0);
      const { carrier, tables } = structure;
      const source = blocksToText(structureBlocks("model", structure));
      const written = / where/.exec(source)!;
      const domain = source
        .slice(0, written.index)
        .split(/[\n;] */)
        .at(-1)!;
      const rows = kindTable(structure)!.rows;
      const covered = new Set<number>();
      for (const [words, forth, back] of rows) {
        const read = readDefinition(`${domain} where Rxy iff ${inlineToText(words!)}`).structure
          .relations[0]!;
        if (!("formula" in read)) throw new Error("points");
        const kinds = [...definedTable(carrier, read)].flatMap((value, kind) => (value === 1 ? [kind] : []));
        expect(kinds, inlineToText(words!)).toHaveLength(1);
        const [kind] = kinds as [number];
        const reverse = carrier.kindOf(kindExamplesOf(carrier, 2)[kind]!, [1, 0]);
        const { holds } = tables.get("R")!;
        expect([forth, back]).toEqual([[String(holds[kind])], [String(holds[reverse])]]);
        covered.add(kind);
        covered.add(reverse);
      }
      expect(covered.size).toBe(carrier.kindCount(2));
    }
  });

  it("stand beside the picture where the definition is long", () => {
    const text = (source: string) => blocksToText(structureBlocks("model", definedStructure(source)));
    expect(text("dense-line where Rxy iff x < y")).not.toContain("two elements x and y");
    expect(
      text(
        "half-line at each point of half-line where Rxy iff x.outer < y.outer or x.outer = y.outer and x.inner < y.inner",
      ),
    ).toContain(
      [
        "two elements x and y                   Rxy  Ryx",
        "───────────────────────────────────────────────",
        "x.outer = y.outer ∧ x.inner < y.inner  1    0",
        "x.outer < y.outer                      1    0",
        "x = y                                  0    0",
      ].join("\n"),
    );
  });
});

describe("answers with infinite structures", () => {
  const rationals = definedStructure("dense-line where Rxy iff x < y");
  const derive = stated("derive", { premises: order, conclusion });

  it("name the domain and have the definition in every form", () => {
    const answer = found("countermodel", rationals, { searches: [searched({ noneUpTo: 6 })] });
    const { summary, data } = showAnswer(derive, answer);
    expect(summary).toBe(
      "fails: a countermodel on the rational line (checked); none on 1 to 6 points (complete search)",
    );
    checkBundle(data);
    expect(data["text/plain"]).toContain(
      "countermodel, infinite: the rational line; dense-line where Rxy iff x < y",
    );
    expect(data["text/html"]).toContain("<code>dense-line where Rxy iff x &lt; y</code>");
    expect(data["text/html"]).toContain("a sample: 4 of infinitely many elements");
    expect(data["text/latex"]).toContain("$\\text{dense-line}\\ \\text{where}\\ Rxy\\ \\text{iff}\\ x < y$");
    expect(dataOf(derive, answer)).toEqual({
      claim: "entails",
      countermodelSize: null,
      noCountermodelUpTo: 6,
      infiniteModel: "dense-line where R(x,y) iff x < y",
    });
  });

  it("have a definition that can be pasted into a cell", () => {
    for (const [number, description] of CARRIERS.entries()) {
      const structure = tabled(description, (kind) => (kind * 5 + number) % 4 < 2);
      const answer = found("countermodel", structure);
      const { data } = showAnswer(derive, answer);
      checkBundle(data);
      const shown = /<code>([^<]* where [^<]*)<\/code>/.exec(
        data["text/html"]!.replaceAll("derive …", ""),
      )![1]!;
      const source = shown.replaceAll("&lt;", "<").replaceAll("&gt;", ">");
      const read = readDefinition(source).structure.relations[0]!;
      if (!("formula" in read)) throw new Error("points");
      expect(definedTable(structure.carrier, read), source).toEqual(structure.tables.get("R")!.holds);
      expect(data["text/plain"]).toContain(source);
    }
  });

  it("say when a sentence is too deep for the structure, and how much there would be to list", () => {
    const claim = {
      kind: "true-in",
      structure: readDefinition("half-line where Rxy iff x < y"),
      sentence: conclusion,
    } as const;
    const summary = (configurations: number, ended: "budget" | "memory") =>
      showAnswer(
        stated("claim", { claim }),
        claimAnswer({ searches: [searched({ noneUpTo: 0, ended, configurations })] }),
      ).summary;
    expect(summary(123456789, "budget")).toBe(
      "open: a sentence of depth 2 is too deep for the natural numbers: to list all cases would take up to 123,456,789 configurations; the budget of 200,000 steps ended",
    );
    const beyond = "to list all cases would take more than 10^15 configurations";
    expect(summary(Number.POSITIVE_INFINITY, "memory").endsWith(beyond)).toBe(true);
    expect(summary(1e15 + 2, "memory").endsWith(beyond)).toBe(true);
  });

  it("say on what carriers nothing was found", () => {
    const shown = (noneUpTo: number, noneOnCarriers: number) =>
      showAnswer(
        stated("conjecture", { claim: entails }),
        claimAnswer({ searches: [searched({ noneUpTo, noneOnCarriers })] }),
      ).summary;
    const all = `${CARRIERS.length} infinite carriers`;
    expect(shown(8, 0)).toBe("open: no countermodel on 1 to 8 points; 12,345 of 200,000 steps");
    expect(shown(8, 20)).toBe(
      `open: no countermodel on 1 to 8 points; none on 20 of ${all}; 12,345 of 200,000 steps`,
    );
    expect(shown(0, 20)).toBe(`open: no countermodel on 20 of ${all}; 12,345 of 200,000 steps`);
  });
});

describe("structures of free terms", () => {
  const terms = {
    constructors: { f: ["x", "y"], e: [] },
    relations: {
      R: { on: 1, others: ["w"], cases: { e: ["false"], f: ["or", ["is", "R", "w", "x"], ["=", "w", "y"]] } },
    },
  } as const;
  const structure = { terms, certificates: [] };

  it("are shown by their constructors and the recursion of each relation", () => {
    const statement = stated("check-finite", { theory: order });
    const { summary, data } = showAnswer(stated("derive", { premises: order, conclusion }), {
      ...claimAnswer({ verdict: "fails", evidence }),
      structures: [{ role: "countermodel", structure }],
    });
    expect(statement.kind).toBe("check-finite");
    expect(summary).toBe("fails: a countermodel on the free terms of e and f(x, y) (checked)");
    checkBundle(data);
    expect(data["text/plain"]).toContain("R(w, e)        never\nR(w, f(x, y))  Rwx ∨ w = y");
    expect(data["text/latex"]).toContain("$R(w,f(x,y))$");
  });

  it("are drawn by their smallest terms", () => {
    // Sets made of e, the empty set, by adding a second one: {e}, {e, {e}}, {e}, {e, {e}} …
    const { caption, alt, svg } = drawTerms(terms)!;
    expect(caption).toContain(
      "a = e, b = f(e, e), c = f(e, f(e, e)), d = f(f(e, e), e), g = f(e, f(e, f(e, e)))",
    );
    expect(alt).toContain("Among them R holds of (a,b), (a,d), (b,c) and (c,g).");
    expect(strokesOf(svg)).toEqual([4, 0, 0, 4]);
    expect(findOverlaps(svg)).toEqual([]);
    const two = { ...terms, relations: { ...terms.relations, S: { ...terms.relations.R } } };
    expect(drawTerms(two)).toBeNull();
  });
});

describe("defined structures", () => {
  it("are confirmed, described as they were defined, and stand in sentences", () => {
    const definition = readDefinition("half-line where Rxy iff not y <= x").structure;
    const defined = showDefinition(
      stated("define", { definition: { kind: "structure", name: "N", structure: definition } }) as never,
    );
    expect(defined.summary).toBe("defined N: a structure on the natural numbers");
    const statement = stated("describe", {
      subject: { kind: "structure", structure: { text: "N", structure: definition } },
    });
    const { data } = showDescription(statement as never);
    checkBundle(data);
    expect(data["text/plain"]).toContain("in cell text: half-line where Rxy iff ¬y ≤ x");
    expect(dataOf(statement, null)).toEqual({
      kind: "structure",
      size: null,
      definition: "half-line where R(x,y) iff ~y <= x",
    });
    expect(inlineStructure(definition)).toEqual({
      "text/plain": "half-line where Rxy iff ¬y ≤ x",
      "text/markdown": "`half-line where Rxy iff ¬y ≤ x`",
      "text/latex": "$\\text{half-line}\\ \\text{where}\\ Rxy\\ \\text{iff}\\ \\neg y \\leq x$",
    });
  });

  it("on finitely many elements are shown on points as well", () => {
    const definition = readDefinition(
      "points 2 at each point of points 2 where Rxy iff x.inner = 1 and y.outer = 2",
    ).structure;
    const statement = stated("describe", {
      subject: { kind: "structure", structure: { text: "F", structure: definition } },
    });
    const { summary, data } = showDescription(statement as never);
    expect(summary).toBe("F: a structure on 4 points");
    checkBundle(data);
    expect(data["text/plain"]).toContain(
      "the same on points: points 4 where R is { (1,3), (1,4), (3,3), (3,4) }",
    );
    expect(dataOf(statement, null)).toMatchObject({ size: 4, relations: { R: [[1, 3], [1, 4], [3, 3], [3, 4]] } }); // biome-ignore format: a table
  });
});
