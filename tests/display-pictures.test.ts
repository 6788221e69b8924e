/** Pictures of all small relations: nothing in them overlaps, and the way of drawing is that of their kind. */
import { beforeAll, describe, expect, it } from "vitest";
import { drawGallery, drawStructure, prepareDrawing } from "../kernel/display/drawing.ts";
import { layOutFunctional } from "../kernel/display/layout-functional.ts";
import { classesOf, isSymmetric, matrixOf, orderKind } from "../kernel/display/order.ts";
import { buildStructure, type Structure } from "../lib/carriers/structure.ts";
import { readMarkup } from "./support/markup.ts";
import { findOverlaps } from "./support/picture-geometry.ts";

beforeAll(prepareDrawing);

function structureOf(size: number, pairs: readonly (readonly number[])[]): Structure {
  return buildStructure({
    carrier: { kind: "points", size },
    relations: [{ relation: { name: "R", places: 2, infix: false }, tuples: pairs.map((pair) => [...pair]) }],
  });
}

function permutations(size: number): number[][] {
  if (size === 0) return [[]];
  return permutations(size - 1).flatMap((shorter) =>
    Array.from({ length: size }, (_, at) => [...shorter.slice(0, at), size - 1, ...shorter.slice(at)]),
  );
}

/** One relation of each class of isomorphic ones, as lists of pairs: that whose bits are the least number. */
function classesOn(size: number): (readonly (readonly number[])[])[] {
  const moves = permutations(size).map((order) =>
    Array.from(
      { length: size * size },
      (_, bit) => order[Math.floor(bit / size)]! * size + order[bit % size]!,
    ),
  );
  const found: number[][][] = [];
  for (let bits = 0; bits < 2 ** (size * size); bits += 1) {
    const isLeast = moves.every((move) => {
      let moved = 0;
      for (let bit = 0; bit < move.length; bit += 1) if ((bits >> bit) & 1) moved |= 1 << move[bit]!;
      return moved >= bits;
    });
    if (!isLeast) continue;
    const pairs: number[][] = [];
    for (let bit = 0; bit < size * size; bit += 1)
      if ((bits >> bit) & 1) pairs.push([Math.floor(bit / size) + 1, (bit % size) + 1]);
    found.push(pairs);
  }
  return found;
}

const classes = [1, 2, 3, 4].map((size) => ({ size, relations: classesOn(size) }));

describe("all relations up to isomorphism", () => {
  // Relations: OEIS A000595; partial orders: A000112; graphs: A000088.
  it.each([
    [1, 2, 1, 1],
    [2, 10, 2, 2],
    [3, 104, 5, 4],
    [4, 3044, 16, 11],
  ])("on %i points are drawn without overlaps", (size, relations, orders, graphs) => {
    const all = classes[size - 1]!.relations;
    expect(all).toHaveLength(relations);
    const matrices = all.map((pairs) => matrixOf(size, pairs));
    expect(matrices.filter((matrix) => orderKind(matrix) === "strict-order")).toHaveLength(orders);
    const loopless = (matrix: (typeof matrices)[number]) => matrix.every((row, i) => !row[i]);
    expect(matrices.filter((matrix) => isSymmetric(matrix) && loopless(matrix))).toHaveLength(graphs);
    const bad = all.flatMap((pairs) => {
      const troubles = findOverlaps(drawStructure(structureOf(size, pairs))!.svg);
      return troubles.length === 0 ? [] : [`${JSON.stringify(pairs)}: ${troubles.join("; ")}`];
    });
    expect(bad).toEqual([]);
  });
});
