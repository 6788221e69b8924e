/** Pictures of relations of each kind: nothing in them overlaps, and each kind is drawn in its own way. */
import fc from "fast-check";
import { beforeAll, describe, expect, it } from "vitest";
import { drawGallery, drawStructure, prepareDrawing } from "../kernel/display/drawing.ts";
import {
  classesOf,
  converseOf,
  coveringPairs,
  differencesOf,
  isFunctional,
  isReflexive,
  isSymmetric,
  isTransitive,
  type Matrix,
  matrixOf,
  orderKind,
} from "../kernel/display/order.ts";
import { buildStructure } from "../lib/carriers/defined.ts";
import type { Structure } from "../lib/carriers/structure.ts";
import { readMarkup } from "./support/markup.ts";
import { findOverlaps } from "./support/picture-geometry.ts";
import { type Pairs, relationsUpToIsomorphism } from "./support/small-relations.ts";

beforeAll(prepareDrawing);

function structureOf(size: number, tables: Readonly<Record<string, Pairs>>): Structure {
  return buildStructure({
    carrier: { kind: "points", size },
    relations: Object.entries(tables).map(([name, pairs]) => ({
      relation: { name, places: pairs[0]?.length ?? 2, infix: false },
      tuples: pairs.map((pair) => [...pair]),
    })),
  });
}

const draw = (size: number, pairs: Pairs) => drawStructure(structureOf(size, { R: pairs }))!;

const bySize = [1, 2, 3, 4].map((size) =>
  relationsUpToIsomorphism(size).map((pairs) => ({ size, pairs, matrix: matrixOf(size, pairs) })),
);
const small = bySize.flat();
const ofKind = (fits: (matrix: Matrix) => boolean) => small.filter(({ matrix }) => fits(matrix));
const isLoopless = (matrix: Matrix) => matrix.every((row, i) => !row[i]);
const countOn = (size: number, fits: (matrix: Matrix) => boolean) =>
  bySize[size - 1]!.filter(({ matrix }) => fits(matrix)).length;

const kinds: Readonly<Record<string, (matrix: Matrix) => boolean>> = {
  "strict orders": (matrix) => orderKind(matrix) === "strict-order",
  "partial orders": (matrix) => orderKind(matrix) === "partial-order",
  preorders: (matrix) => isReflexive(matrix) && isTransitive(matrix),
  graphs: (matrix) => isSymmetric(matrix) && isLoopless(matrix),
  tournaments: (matrix) =>
    matrix.every((row, i) => row.every((holds, j) => (i === j ? !holds : holds !== matrix[j]![i]))),
  maps: (matrix) => matrix.every((row) => row.filter(Boolean).length === 1),
  "equivalence relations": (matrix) => isReflexive(matrix) && isSymmetric(matrix) && isTransitive(matrix),
};

describe("small relations", () => {
  // Up to isomorphism, on 1, 2, … points. Relations: OEIS A000595; digraphs: A000273.
  it.each([
    [1, 2, 1],
    [2, 10, 3],
    [3, 104, 16],
    [4, 3044, 218],
  ])("on %i points are as many as are known", (size, relations, digraphs) => {
    expect(bySize[size - 1]).toHaveLength(relations);
    expect(countOn(size, isLoopless)).toBe(digraphs);
  });

  it("on up to 3 points, and digraphs on 4 points, are drawn without overlaps", () => {
    for (const { size, pairs, matrix } of small)
      if (size < 4 || isLoopless(matrix))
        expect(findOverlaps(draw(size, pairs).svg), JSON.stringify(pairs)).toEqual([]);
  });

  // Orders: OEIS A000112; preorders: A001930; graphs: A000088; tournaments: A000568; maps: A001372;
  // equivalence relations: A000041.
  it.each([
    ["strict orders", 16],
    ["partial orders", 16],
    ["preorders", 33],
    ["graphs", 11],
    ["tournaments", 4],
    ["maps", 19],
    ["equivalence relations", 5],
  ])("that are %s are drawn without overlaps, %i of them on 4 points", (kind, count) => {
    expect(countOn(4, kinds[kind]!)).toBe(count);
    for (const { size, pairs } of ofKind(kinds[kind]!))
      expect(findOverlaps(draw(size, pairs).svg), JSON.stringify(pairs)).toEqual([]);
  });
});

describe("ways to draw", () => {
  const parts = (svg: string) => {
    const { elements, text } = readMarkup(svg, []);
    const count = (name: string) => elements.filter((element) => element.name === name).length;
    // The first rectangle is the card.
    return {
      text,
      lines: count("path"),
      heads: count("polygon"),
      circles: count("circle"),
      boxes: count("rect") - 1,
    };
  };

  it("merge the equivalent points of a preorder and list them", () => {
    const preorders = ofKind((matrix) => kinds.preorders!(matrix) && !isSymmetric(matrix));
    expect(preorders.length).toBeGreaterThan(20);
    for (const { size, pairs, matrix } of preorders) {
      const { svg, caption } = draw(size, pairs);
      const { classes, order } = classesOf(matrix);
      const { lines, heads, circles, boxes, text } = parts(svg);
      expect([lines, heads, circles + boxes]).toEqual([coveringPairs(order).length, 0, classes.length]);
      for (const points of classes) expect(text).toContain(points.map((point) => point + 1).join(", "));
      if (classes.length < size) expect(caption).toContain("points in one outline are related both ways");
    }
  });

  it("frame the classes of an equivalence relation", () => {
    for (const { size, pairs, matrix } of ofKind(kinds["equivalence relations"]!)) {
      const { lines, circles, boxes } = parts(draw(size, pairs).svg);
      expect([lines, circles, boxes]).toEqual([0, size, classesOf(matrix).classes.length]);
    }
  });

  it("do not merge points at which something different is written", () => {
    const all = [[1, 1], [1, 2], [2, 1], [2, 2], [1, 3], [2, 3], [3, 3]]; // biome-ignore format: a table
    const { caption } = drawStructure(structureOf(3, { R: all, Deep: [[1]] }))!;
    expect(caption).toContain("an arrow from x to y");
  });

  it("say in the caption what the lines are", () => {
    expect(draw(3, [[1, 2], [2, 3], [3, 1]]).caption).toBe("an arrow from x to y: R holds of (x, y)"); // biome-ignore format: a table
    expect(draw(3, [[1, 2], [2, 1], [3, 1], [1, 1]]).caption).toContain("heads at both ends"); // biome-ignore format: a table
    expect(draw(2, [[1, 2], [2, 1]]).caption).toContain("each line stands for both directions"); // biome-ignore format: a table
    expect(draw(2, []).caption).toBe("R holds of no pair");
  });

  it("put the greater point higher, also where the sign says that it comes first", () => {
    const heights = (name: string) => {
      const { svg, caption } = drawStructure(structureOf(3, { [name]: [[1, 2], [2, 3], [1, 3]] }))!; // biome-ignore format: a table
      const circles = readMarkup(svg, []).elements.filter((element) => element.name === "circle");
      return { caption, ys: circles.map(({ attributes }) => Number(attributes.get("cy"))) };
    };
    const less = heights("≺");
    expect(less.caption).toContain("≺ by upward lines");
    expect(less.ys[0]).toBeGreaterThan(less.ys[2]!);
    const greater = heights("≻");
    expect(greater.caption).toContain("≻ by downward lines");
    expect(greater.ys[0]).toBeLessThan(greater.ys[2]!);
  });

  it("show maps of up to 12 points without overlaps", () => {
    const maps = fc
      .integer({ min: 1, max: 12 })
      .chain((size) => fc.array(fc.integer({ min: 1, max: size }), { minLength: size, maxLength: size }));
    fc.assert(
      fc.property(maps, (map) => {
        const pairs = map.map((target, i) => [i + 1, target]);
        const matrix = matrixOf(map.length, pairs);
        expect(isFunctional(matrix)).toBe(true);
        const most = Math.max(...converseOf(matrix).map((row) => row.filter(Boolean).length));
        // More heads than these do not fit around a point that is not in the middle.
        if (most <= 5) expect(findOverlaps(draw(map.length, pairs).svg)).toEqual([]);
      }),
      { seed: 20260406, numRuns: 200 },
    );
  });

  it("show two relations on 3 points without overlaps", () => {
    const pair = fc.tuple(fc.integer({ min: 1, max: 3 }), fc.integer({ min: 1, max: 3 }));
    const relation = fc.uniqueArray(pair, { selector: ([x, y]) => x * 3 + y });
    fc.assert(
      fc.property(relation, relation, (Near, Far) => {
        const { svg } = drawStructure(structureOf(3, { Near, Far }))!;
        // The legend has lines of its own.
        expect(findOverlaps(svg.slice(0, svg.indexOf("</g>")).concat("</g></svg>"))).toEqual([]);
      }),
      { seed: 20260407, numRuns: 200 },
    );
  });
});

describe("galleries", () => {
  const structures = (fits: (matrix: Matrix) => boolean) =>
    ofKind(fits)
      .filter(({ size }) => size === 3)
      .map(({ size, pairs }) => structureOf(size, { R: pairs }));

  it("draw all structures in one way", () => {
    const orders = drawGallery(structures(kinds["strict orders"]!))!;
    expect(orders.caption).toBe("R by upward lines; transitive pairs left out");
    const equivalences = drawGallery(structures(kinds["equivalence relations"]!))!;
    expect(equivalences.caption).toContain("stand in one frame");
    const partial = drawGallery(structures(kinds["partial orders"]!))!;
    expect(partial.caption).toContain("loops and transitive pairs left out");
    const all = drawGallery(structures(() => true))!;
    expect(all.pictures).toHaveLength(104);
    expect(all.caption).toContain("an arrow from x to y");
    const pairs = structures(() => true).map((structure) => structure.tables.get("R")!.holds);
    all.pictures.forEach(({ svg }, index) => {
      const heads = readMarkup(svg, []).elements.filter(({ name }) => name === "polygon").length;
      expect(heads).toBe(pairs[index]!.reduce((sum, bit) => sum + bit, 0));
      expect(findOverlaps(svg)).toEqual([]);
    });
  });

  it("tell relations apart by strokes, and name these in the caption", () => {
    const two = drawGallery([1, 2, 3].map((last) => structureOf(3, { Near: [[1, 2]], Far: [[2, last]] })))!;
    expect(two.caption).toContain("Near: solid, Far: dashed");
    for (const { svg } of two.pictures) expect(svg).toContain("stroke-dasharray");
  });

  it("are not made of what cannot be drawn", () => {
    expect(drawGallery([])).toBeNull();
    expect(drawGallery([structureOf(30, { R: [[1, 2]] })])).toBeNull();
    expect(drawGallery([structureOf(2, { R: [[1, 2]] }), structureOf(2, { S: [[1, 2]] })])).toBeNull();
  });
});

describe("larger structures", () => {
  const around = (size: number, differences: readonly number[]) =>
    Array.from({ length: size }, (_, i) => differences.map((d) => [i + 1, ((i + d) % size) + 1])).flat();

  it("are drawn while their lines can be followed", () => {
    expect(draw(13, around(13, [1, 2, 3, 4, 5, 6]))).not.toBeNull();
    expect(draw(20, around(20, [1]))).not.toBeNull();
    expect(draw(20, around(20, [1, 2, 3, 4, 5, 6, 7, 8, 9]))).toBeNull();
    expect(draw(21, around(21, [1]))).toBeNull();
  });

  it("depend on differences exactly when turning them changes nothing", () => {
    for (const { size, matrix } of small) {
      const turned = matrix.map((row, i) => row.map((_, j) => matrix[(i + 1) % size]![(j + 1) % size]!));
      expect(differencesOf(matrix) !== null).toBe(JSON.stringify(turned) === JSON.stringify(matrix));
    }
    expect(differencesOf(matrixOf(7, around(7, [1, 2, 4])))).toEqual([1, 2, 4]);
  });
});

describe("the measure of overlaps", () => {
  const svg = (inner: string) => `<svg><rect x="0" y="0" width="1" height="1"/><g>${inner}</g></svg>`;
  const circle = (x: number, y: number) => `<circle cx="${x}" cy="${y}" r="13"/>`;
  const line = (x: number, y: number, toX: number, toY: number) =>
    `<path d="M${x} ${y}C${x} ${y} ${toX} ${toY} ${toX} ${toY}"/>`;

  it.each<[string, string, RegExp | null]>([
    ["points apart", circle(0, 0) + circle(40, 0), null],
    ["points that touch", circle(0, 0) + circle(20, 0), /points 0 and 1 touch/],
    [
      "a line over a point",
      circle(0, 0) + circle(50, 0) + circle(100, 0) + line(13, 0, 87, 0),
      /over point 1/,
    ],
    [
      "lines that cross",
      circle(0, 0) +
        circle(99, 99) +
        circle(99, 0) +
        circle(0, 99) +
        line(10, 10, 90, 90) +
        line(90, 10, 10, 90),
      null,
    ],
    [
      "lines on each other",
      circle(0, 0) + circle(99, 0) + line(13, 0, 86, 0) + line(13, 1, 86, 1),
      /lines 0 and 1/,
    ],
    [
      "heads on each other",
      `${circle(0, 0)}<polygon points="20,0 22,0 22,2"/><polygon points="21,0 23,0 23,2"/>`,
      /heads 0 and 1/,
    ],
    [
      "a point outside its frame",
      `${circle(0, 0)}<rect x="0" y="0" width="40" height="40" fill="none"/>`,
      /lies in 0 frames/,
    ],
  ])("sees %s", (_, inner, trouble) => {
    const troubles = findOverlaps(svg(inner)).join("; ");
    if (trouble === null) expect(troubles).toBe("");
    else expect(troubles).toMatch(trouble);
  });
});
