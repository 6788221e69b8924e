/** Pictures of structures, and what decides how a relation is drawn. */
import fc from "fast-check";
import { beforeAll, describe, expect, it } from "vitest";
import { drawStructure, prepareDrawing } from "../kernel/display/drawing.ts";
import {
  coveringPairs,
  isAcyclic,
  isReflexive,
  isSymmetric,
  isTransitive,
  type Matrix,
  matrixOf,
  orderKind,
} from "../kernel/display/order.ts";
import { buildStructure } from "../lib/carriers/defined.ts";
import type { Structure } from "../lib/carriers/structure.ts";
import type { RelationSymbol } from "../lib/logic/formula.ts";
import { readMarkup } from "./support/markup.ts";

beforeAll(prepareDrawing);

const symbol = (name: string, places = 2): RelationSymbol => ({ name, places, infix: false });

/** The relation on so many points whose pairs are the bits of a number. */
function numbered(size: number, bits: number): number[][] {
  const pairs: number[][] = [];
  for (let i = 0; i < size; i += 1)
    for (let j = 0; j < size; j += 1) if ((bits >> (i * size + j)) & 1) pairs.push([i + 1, j + 1]);
  return pairs;
}

function structureOf(size: number, tables: Readonly<Record<string, number[][]>>): Structure {
  return buildStructure({
    carrier: { kind: "points", size },
    relations: Object.entries(tables).map(([name, tuples]) => ({
      relation: symbol(name, tuples[0]?.length ?? 2),
      tuples,
    })),
  });
}

function draw(structure: Structure) {
  const picture = drawStructure(structure)!;
  const { elements, text } = readMarkup(picture.svg, []);
  for (const { attributes } of elements)
    for (const value of attributes.values()) expect(value).not.toMatch(/NaN|Infinity|undefined/);
  const count = (name: string) => elements.filter((element) => element.name === name).length;
  return {
    picture,
    elements,
    text,
    paths: count("path"),
    heads: count("polygon"),
    points: count("circle") + count("ellipse"),
  };
}

/** The transitive closure by repeated composition. */
function closureOf(size: number, pairs: readonly (readonly [number, number])[]): Matrix {
  const holds = Array.from({ length: size }, () => new Array<boolean>(size).fill(false));
  for (const [i, j] of pairs) holds[i]![j] = true;
  for (let k = 0; k < size; k += 1)
    for (let i = 0; i < size; i += 1)
      for (let j = 0; j < size; j += 1) if (holds[i]![k] && holds[k]![j]) holds[i]![j] = true;
  return holds;
}

describe("kinds of relations", () => {
  // Numbers of partial orders on 1 to 4 labelled points: OEIS A001035.
  it.each([
    [1, 1],
    [2, 3],
    [3, 19],
    [4, 219],
  ])("finds the partial orders on %i labelled points", (size, count) => {
    const kinds = { "strict-order": 0, "partial-order": 0, none: 0 };
    for (let bits = 0; bits < 2 ** (size * size); bits += 1)
      kinds[orderKind(matrixOf(size, numbered(size, bits))) ?? "none"] += 1;
    expect(kinds["strict-order"]).toBe(count);
    expect(kinds["partial-order"]).toBe(count);
  });

  // Numbers of labelled acyclic digraphs: OEIS A003024; loops do not count here, hence the factor.
  it.each([
    [1, 1],
    [2, 3],
    [3, 25],
  ])("finds the acyclic relations on %i points", (size, count) => {
    let found = 0;
    for (let bits = 0; bits < 2 ** (size * size); bits += 1)
      if (isAcyclic(matrixOf(size, numbered(size, bits)))) found += 1;
    expect(found).toBe(count * 2 ** size);
  });

  it("finds the symmetric relations", () => {
    let found = 0;
    for (let bits = 0; bits < 512; bits += 1) if (isSymmetric(matrixOf(3, numbered(3, bits)))) found += 1;
    expect(found).toBe(2 ** 6);
  });
});

describe("covering pairs", () => {
  const orders = fc.integer({ min: 1, max: 9 }).chain((size) =>
    fc.array(fc.tuple(fc.nat(size - 1), fc.nat(size - 1)), { maxLength: 20 }).map((pairs) => {
      const upward = pairs.filter(([i, j]) => i < j);
      return { size, order: closureOf(size, upward) };
    }),
  );

  it("are the least set of pairs that gives the order back", () => {
    fc.assert(
      fc.property(orders, fc.boolean(), ({ size, order }, isReflexive) => {
        const given = order.map((row, i) => row.map((holds, j) => (i === j ? isReflexive : holds)));
        const covering = coveringPairs(given);
        expect(closureOf(size, covering)).toEqual(order);
        covering.forEach((_, left) => {
          const fewer = covering.filter((__, index) => index !== left);
          expect(closureOf(size, fewer)).not.toEqual(order);
        });
      }),
      { seed: 20260401 },
    );
  });
});

describe("pictures", () => {
  it("show every point and every arc of all relations on up to 3 points", () => {
    for (let size = 1; size <= 3; size += 1)
      for (let bits = 0; bits < 2 ** (size * size); bits += 1) {
        const pairs = numbered(size, bits);
        const matrix = matrixOf(size, pairs);
        const { picture, points, paths, heads } = draw(structureOf(size, { R: pairs }));
        for (const [i, j] of pairs) expect(picture.alt).toContain(`(${i},${j})`);
        // Preorders merge points and are tested with the other ways to draw.
        if (isReflexive(matrix) && isTransitive(matrix) && orderKind(matrix) === null) continue;
        expect(points).toBe(size);
        const lines = pairs.filter(([i, j]) => i! < j! || !matrix[j! - 1]![i! - 1] || i === j).length;
        if (isReflexive(matrix) && isTransitive(matrix) && isSymmetric(matrix))
          expect([paths, heads]).toEqual([0, 0]);
        else if (isSymmetric(matrix)) expect([paths, heads]).toEqual([lines, 0]);
        else if (orderKind(matrix) !== null) {
          expect([paths, heads]).toEqual([coveringPairs(matrix).length, 0]);
          expect(picture.caption).toContain("R by upward lines");
          const isReduced = coveringPairs(matrix).length < pairs.filter(([i, j]) => i !== j).length;
          expect(picture.caption.includes("transitive pairs left out")).toBe(isReduced);
        } else expect([paths, heads]).toEqual([lines, pairs.length]);
      }
  });

  it("show two relations on 2 points whatever they are, with a legend", () => {
    for (let first = 0; first < 16; first += 1)
      for (let second = 0; second < 16; second += 1) {
        const { text, points } = draw(structureOf(2, { Near: numbered(2, first), Far: numbered(2, second) }));
        expect(points).toBe(2);
        expect(text).toContain("Near");
        expect(text).toContain("Far");
      }
  });

  it("tell relations apart by their strokes", () => {
    const cycle = [[1, 2], [2, 3], [3, 1]]; // biome-ignore format: a table
    const { elements } = draw(structureOf(3, { A: cycle, B: cycle, C: cycle, D: cycle }));
    const strokes = new Set(
      elements
        .filter(({ name }) => name === "path")
        .map(({ attributes }) => attributes.get("stroke-dasharray")),
    );
    expect(strokes.size).toBe(4);
  });

  it("place the greater point of an order higher", () => {
    const divides: number[][] = [];
    for (let i = 1; i <= 12; i += 1) for (let j = 1; j <= 12; j += 1) if (j % i === 0) divides.push([i, j]);
    const { elements } = draw(structureOf(12, { R: divides }));
    const heights = elements
      .filter(({ name }) => name === "circle")
      .map(({ attributes }) => Number(attributes.get("cy")));
    for (const [i, j] of divides) if (i !== j) expect(heights[j! - 1]!).toBeLessThan(heights[i! - 1]!);
  });

  it("stay within their frame", () => {
    fc.assert(
      fc.property(
        fc.integer({ min: 1, max: 12 }),
        fc.array(fc.tuple(fc.nat(11), fc.nat(11)), { maxLength: 40 }),
        (size, pairs) => {
          const kept = pairs.filter(([i, j]) => i < size && j < size).map(([i, j]) => [i + 1, j + 1]);
          const { elements } = draw(structureOf(size, { R: kept }));
          const [width, height] = ["width", "height"].map((key) => Number(elements[0]!.attributes.get(key)));
          const shift = /translate\(([-\d.]+) ([-\d.]+)\)/.exec(
            elements.find(({ name }) => name === "g")!.attributes.get("transform")!,
          )!;
          for (const { name, attributes } of elements) {
            if (name !== "circle") continue;
            const [x, y] = [
              Number(attributes.get("cx")) + Number(shift[1]),
              Number(attributes.get("cy")) + Number(shift[2]),
            ];
            expect(x).toBeGreaterThan(13);
            expect(y).toBeGreaterThan(13);
            expect(x).toBeLessThan(width! - 13);
            expect(y).toBeLessThan(height! - 13);
          }
        },
      ),
      { seed: 20260402 },
    );
  });

  it("are not made of what has no pairs to draw, too many points or too many relations", () => {
    expect(drawStructure(structureOf(21, { R: [[1, 2]] }))).toBeNull();
    expect(drawStructure(structureOf(3, { P: [[1]] }))).toBeNull();
    const names = ["A", "B", "C", "D", "E"].map((name) => [name, [[1, 2]]]);
    expect(drawStructure(structureOf(3, Object.fromEntries(names)))).toBeNull();
  });

  it("write one-place relations at their points and say what is not drawn", () => {
    const { text, picture } = draw(structureOf(3, { R: [[1, 2]], Deep: [[2]], Between: [[1, 2, 3]] }));
    expect(text).toContain("2Deep");
    expect(picture.caption).toContain("Between not drawn");
  });

  it("are the same bytes every time", () => {
    const structure = structureOf(5, { R: [[1, 2], [2, 3], [1, 4], [4, 4]] }); // biome-ignore format: a table
    expect(drawStructure(structure)).toEqual(drawStructure(structure));
  });
});
