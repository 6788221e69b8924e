/**
 * As `carriers-trees.test.ts`, one quantifier deeper, over wider neighbourhoods of true elements, and with more forests and
 * sentences.
 */
import fc from "fast-check";
import { describe, expect, it } from "vitest";
import { DenseTree } from "../lib/carriers/dense-tree.ts";
import { Forest } from "../lib/carriers/forest.ts";
import { HalfLine } from "../lib/carriers/half-line.ts";
import { IntegerLine } from "../lib/carriers/integer-line.ts";
import type { Structure } from "../lib/carriers/structure.ts";
import type { Formula, RelationSymbol } from "../lib/logic/formula.ts";
import { Meter } from "../lib/logic/meter.ts";
import type { ForestDescription } from "../lib/logic/structure-definition.ts";
import { satisfies } from "../lib/structures/evaluate.ts";
import {
  atomicOfForest,
  denseTree,
  depthOf,
  forest,
  isTrueOfTree,
  listedTypes,
  orderOfMeets,
  orderOfNodes,
  regularTree,
  Types,
  told,
  trueTypes,
} from "./support/carriers-trees.ts";
import { sentences } from "./support/random-formulas.ts";

const seed = Number(process.env.TWOPLACE_SEED ?? 20261208);
console.log(`seed ${seed}`);
const options = (numRuns: number) => ({ seed, numRuns, verbose: 1 as const });

const R: RelationSymbol = { name: "R", places: 2, infix: false };

/** Forest, depth, and how much wider neighbourhoods are than they need be. */
const compared: readonly (readonly [ForestDescription, number, number])[] = [
  [forest(1, false, 2), 4, 2],
  [forest(1, true, 1, 2), 4, 2],
  [forest(2, false, 0), 4, 2],
  [forest(2, true, 0, 3), 4, 2],
  [forest(3, true, 0, 2), 4, 2],
  [forest(4, true, 0, 2), 4, 1],
  [forest(2, false, 1), 4, 2],
  [forest(2, true, 1, 0), 4, 2],
  [forest(3, true, 1, 1), 4, 1],
  [forest(2, false, 1), 3, 4],
  [forest(3, false, 1), 3, 3],
  [forest(2, true, 1, 1), 3, 4],
  [forest(2, false, 2), 4, 1],
  [forest(2, true, 2, 0), 3, 3],
  [forest(3, true, 2, 1), 2, 3],
  [forest(3, false, 4), 2, 1],
  [forest(2, true, 5, 3), 2, 1],
];

describe("the dense tree", () => {
  it("formulas of depth 4 say the same of what is listed as of true elements", () => {
    const [carrier, types] = [new DenseTree(), new Types()];
    const atomic = ({ nodes, parents }: { nodes: readonly number[]; parents: readonly number[] }) =>
      orderOfNodes(nodes, parents);
    const listed = listedTypes(carrier, atomic, types)(carrier.empty, 4);
    expect(listed).toBe(trueTypes(denseTree, types)([], 4));
  });

  it("sentences are true as they are of true elements", () => {
    const carrier = new DenseTree();
    const kinds = new Map(
      carrier.kindExamples(2).map(({ nodes, parents }, kind) => [orderOfNodes(nodes, parents), kind]),
    );
    fc.assert(
      fc.property(tablesOn(carrier), ofDepth(3), (structure, sentence) => {
        const expected = isTrueOfTree(
          denseTree,
          sentence,
          (_, elements) => structure.tables.get("R")!.holds[kinds.get(orderOfMeets(elements))!] === 1,
        );
        expect(satisfies(structure, sentence, new Meter(1e7))).toBe(expected);
      }),
      options(500),
    );
  });
});

describe("regular forests", () => {
  it.each(compared.map((row) => [told(row[0]), ...row] as const))("%s", (_, description, depth, wider) => {
    const { branching, rooted, offset, ends } = description;
    const [carrier, types] = [new Forest(description), new Types()];
    const listed = listedTypes(carrier, atomicOfForest(carrier), types)(carrier.empty, depth);
    const tree = regularTree({ branching, rooted }, offset, ends, wider);
    expect(listed).toBe(trueTypes(tree, types)([], depth));
  });

  it.each(
    [forest(2, false, 1), forest(2, true, 1, 0), forest(3, false, 1), forest(2, true, 2, 1)].map(
      (d) => [told(d), d] as const,
    ),
  )("sentences are true as they are of true elements: %s", (_, description) => {
    const { branching, rooted, offset, ends } = description;
    const carrier = new Forest(description);
    const atomic = atomicOfForest(carrier);
    const kinds = new Map(carrier.kindExamples(2).map((example, kind) => [atomic(example), kind]));
    const tree = regularTree({ branching, rooted }, offset, ends, 1);
    fc.assert(
      fc.property(tablesOn(carrier), ofDepth(3), (structure, sentence) => {
        const expected = isTrueOfTree(
          tree,
          sentence,
          (_relation, elements) => structure.tables.get("R")!.holds[kinds.get(tree.atomic(elements))!] === 1,
        );
        expect(satisfies(structure, sentence, new Meter(1e7))).toBe(expected);
      }),
      options(150),
    );
  });

  it("with one child each satisfy the sentences of the integer line and the half line", () => {
    // The tables of the line do not tell larger from smaller where two numbers are farther apart than the offset.
    for (const rooted of [false, true])
      for (const offset of [1, 2, 3]) {
        const carrier = new Forest(forest(1, rooted, offset, 1));
        const line = rooted
          ? new HalfLine({ kind: "half-line", offset, ends: 1 })
          : new IntegerLine({ kind: "integer-line", offset });
        const nameOf = (difference: number, first: number, second: number) =>
          `${rooted && first === 0} ${rooted && second === 0} ${Math.abs(difference) <= offset ? difference : "far"}`;
        const names = line.kindExamples(2).map(({ positions }) => {
          const [x, y] = positions as [number, number];
          return nameOf(y - x, x, y);
        });
        const treeNames = carrier.kindExamples(2).map((example) => {
          const steps = carrier.steps(example, 0, 1);
          const [x, y] = [0, 1].map((place) => carrier.depth(example, place) ?? -1) as [number, number];
          return nameOf(steps === null ? offset + 1 : steps[1] - steps[0], x, y);
        });
        fc.assert(
          fc.property(tablesOn(carrier), ofDepth(4), (structure, sentence) => {
            const table = structure.tables.get("R")!.holds;
            const holds = Uint8Array.from(names, (name) => table[treeNames.indexOf(name)]!);
            const onLine: Structure = { carrier: line, tables: new Map([["R", { relation: R, holds }]]) };
            expect(satisfies(structure, sentence, new Meter(1e7))).toBe(
              satisfies(onLine, sentence, new Meter(1e7)),
            );
          }),
          options(150),
        );
      }
  });
});

/** Sentences with at most so many quantifiers one inside another. */
function ofDepth(depth: number): fc.Arbitrary<Formula> {
  return sentences([R], depth - 1).filter((sentence) => depthOf(sentence) <= depth);
}

/** Any table for R. */
function tablesOn(carrier: Structure["carrier"]): fc.Arbitrary<Structure> {
  const length = carrier.kindCount(2);
  return fc
    .array(fc.integer({ min: 0, max: 1 }), { minLength: length, maxLength: length })
    .map((entries) => ({
      carrier,
      tables: new Map([["R", { relation: R, holds: Uint8Array.from(entries) }]]),
    }));
}
