/** Pictures of all relations on 4 points: nothing in them overlaps. */
import { beforeAll, expect, it } from "vitest";
import { drawStructure, prepareDrawing } from "../kernel/display/drawing.ts";
import { buildStructure } from "../lib/carriers/defined.ts";
import { findOverlaps } from "./support/picture-geometry.ts";
import { relationsUpToIsomorphism } from "./support/small-relations.ts";

beforeAll(prepareDrawing);

it("all relations on 4 points up to isomorphism are drawn without overlaps", () => {
  const relations = relationsUpToIsomorphism(4);
  // OEIS A000595.
  expect(relations).toHaveLength(3044);
  const bad = relations.flatMap((pairs) => {
    const structure = buildStructure({
      carrier: { kind: "points", size: 4 },
      relations: [
        { relation: { name: "R", places: 2, infix: false }, tuples: pairs.map((pair) => [...pair]) },
      ],
    });
    const troubles = findOverlaps(drawStructure(structure)!.svg);
    return troubles.length === 0 ? [] : [`${JSON.stringify(pairs)}: ${troubles.join("; ")}`];
  });
  expect(bad).toEqual([]);
});
