/**
 * The dense tree and regular forests against their definitions: what formulas of a depth say of true elements, found by
 * walking over all elements of a neighbourhood (`support/carriers-trees.ts`), and the same by what the carriers list.
 */
import fc from "fast-check";
import { describe, expect, it } from "vitest";
import type { Carrier } from "../lib/carriers/carrier.ts";
import { DenseTree, type TreeConfiguration } from "../lib/carriers/dense-tree.ts";
import { Forest, type ForestConfiguration } from "../lib/carriers/forest.ts";
import { HalfLine } from "../lib/carriers/half-line.ts";
import { IntegerLine } from "../lib/carriers/integer-line.ts";
import type { Structure } from "../lib/carriers/structure.ts";
import { recordStructure } from "../lib/carriers/structure-record.ts";
import { isTrueIn } from "../lib/evidence/evaluate.ts";
import type { Formula, RelationSymbol } from "../lib/logic/formula.ts";
import { Meter } from "../lib/logic/meter.ts";
import { recordFormula } from "../lib/logic/records/formulas.ts";
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
  type TrueTree,
  Types,
  told,
  trueTypes,
} from "./support/carriers-trees.ts";
import { infiniteOnly, readSentences } from "./support/corpora.ts";
import { sentences } from "./support/random-formulas.ts";

const seed = Number(process.env.TWOPLACE_SEED ?? 20261206);
console.log(`seed ${seed}`);
const options = (numRuns: number) => ({ seed, numRuns, verbose: 1 as const });

const R: RelationSymbol = { name: "R", places: 2, infix: false };
const B: RelationSymbol = { name: "B", places: 3, infix: false };

/** Forests small enough to walk over the neighbourhoods of true elements. */
const forests: readonly ForestDescription[] = [
  forest(1, false, 2),
  forest(2, false, 0),
  forest(2, false, 1),
  forest(3, false, 1),
  forest(1, true, 1, 0),
  forest(1, true, 2, 1),
  forest(2, true, 0, 2),
  forest(2, true, 1, 0),
  forest(2, true, 1, 2),
  forest(2, true, 2, 1),
  forest(3, true, 0, 2),
  forest(3, true, 1, 1),
];

/** The configurations of so many elements that are listed when a formula of this depth is walked through. */
function configurations<Configuration>(
  carrier: Carrier<Configuration>,
  named: number,
  depth: number,
): Configuration[] {
  let listed = [carrier.empty];
  for (let next = 0; next < named; next += 1)
    listed = listed.flatMap((configuration) => carrier.extensions(configuration, depth - next - 1));
  return listed;
}

describe("the dense tree", () => {
  const carrier = new DenseTree();
  const atomic = ({ nodes, parents }: TreeConfiguration) => orderOfNodes(nodes, parents);

  it("has as many kinds as there are trees with labelled nodes", () => {
    // Rooted trees in which nodes without a label have at least two children, one label at a labelled node: OEIS A005264
    // (Flight 1990). A kind is such a tree over the blocks of a partition: the numbers of partitions are Stirling's.
    const onePerNode = [1, 3, 22, 262];
    const partitions = [[1], [1, 1], [1, 3, 1], [1, 7, 6, 1]];
    for (const [index, blocks] of partitions.entries())
      expect(carrier.kindCount(index + 1)).toBe(
        blocks.reduce((sum, count, size) => sum + count * onePerNode[size]!, 0),
      );
  });

  it.each([1, 2, 3])("formulas of depth %i say the same of what is listed as of true elements", (depth) => {
    const types = new Types();
    const listed = listedTypes(carrier, atomic, types)(carrier.empty, depth);
    expect(listed).toBe(trueTypes(denseTree, types)([], depth));
  });

  it("sentences are true in a structure as they are of true elements", () => {
    const kinds = { R: names(2), B: names(3) };
    function names(length: number) {
      return new Map(carrier.kindExamples(length).map((example, kind) => [atomic(example), kind]));
    }
    fc.assert(
      fc.property(tables(carrier, [R, B]), ofDepth(3, [R, B]), (structure, sentence) => {
        expectTruth(structure, sentence, denseTree, (relation, elements) => {
          const kind = kinds[relation.name as "R" | "B"].get(orderOfMeets(elements))!;
          return structure.tables.get(relation.name)!.holds[kind] === 1;
        });
      }),
      options(60),
    );
  });

  it("knows what is true of its order", () => {
    const order = structureWhere(carrier, (nodes, { parents }) => {
      const [x, y] = nodes as [number, number];
      return x !== y && isBelow(x, y, parents);
    });
    const facts = readSentences([
      "forall x y. exists z. (z = x | R(z,x)) & (z = y | R(z,y)) & (forall w. (w = x | R(w,x)) & (w = y | R(w,y)) -> w = z | R(w,z))",
      "forall x y. R(x,y) -> (exists z. R(x,z) & R(z,y))",
      "forall x. (exists y. R(y,x)) & (exists y. R(x,y))",
      // Above every element, any two have a third that parts from both at that element.
      "forall x y z. R(x,y) & R(x,z) -> (exists u. R(x,u) & ~(exists v. R(x,v) & (v = u | R(v,u)) & (R(v,y) | v = y | R(v,z) | v = z)))",
      "exists x y. ~(exists z. (z = x | R(x,z)) & (z = y | R(y,z)))",
    ]);
    for (const fact of facts) expectIn(order, fact, true);
    // Not so: any two have a common upper bound; some element is the least; above an element there is a chain.
    for (const error of readSentences([
      "forall x y. exists z. R(x,z) & R(y,z)",
      "exists x. forall y. x = y | R(x,y)",
      "exists x. forall y z. R(x,y) & R(x,z) -> y = z | R(y,z) | R(z,y)",
    ]))
      expectIn(order, error, false);
    for (const axiom of axiomsOf("io-45")) expectIn(order, axiom, true);
  });

  function isBelow(x: number, y: number, parents: readonly number[]): boolean {
    return y >= 0 && (x === y || isBelow(x, parents[y]!, parents));
  }

  function structureWhere(
    on: DenseTree,
    holds: (nodes: readonly number[], example: TreeConfiguration) => boolean,
  ): Structure {
    const entries = on.kindExamples(2).map((example) => (holds(example.nodes, example) ? 1 : 0));
    return { carrier: on, tables: new Map([["R", { relation: R, holds: Uint8Array.from(entries) }]]) };
  }

  itObeysTheLaws(carrier, 4);
});

describe("regular forests", () => {
  it("have as many kinds of pairs as there are ways up and down of at most so many steps, and one", () => {
    for (const offset of [0, 1, 2, 3, 7]) {
      expect(new Forest(forest(1, false, offset)).kindCount(2)).toBe(2 * offset + 2);
      for (const rooted of [false, true])
        expect(new Forest(forest(2, rooted, offset)).kindCount(2)).toBe(
          ((offset + 1) * (offset + 2)) / 2 + 1,
        );
    }
  });

  describe.each(forests.map((description) => [told(description), description] as const))(
    "%s",
    (_, description) => {
      const carrier = new Forest(description);
      const { branching, rooted, offset, ends } = description;
      const tree = regularTree({ branching, rooted }, offset, ends, 1);

      it("formulas up to depth 3 say the same of what is listed as of true elements", () => {
        const atomic = atomicOfForest(carrier);
        for (const depth of [1, 2, 3]) {
          const types = new Types();
          const listed = listedTypes(carrier, atomic, types)(carrier.empty, depth);
          expect(listed).toBe(trueTypes(tree, types)([], depth));
        }
      });

      it("sentences are true in a structure as they are of true elements", () => {
        const atomic = atomicOfForest(carrier);
        const kinds = new Map(carrier.kindExamples(2).map((example, kind) => [atomic(example), kind]));
        fc.assert(
          fc.property(tables(carrier, [R]), ofDepth(3, [R]), (structure, sentence) => {
            expectTruth(
              structure,
              sentence,
              tree,
              (_relation, elements) =>
                structure.tables.get("R")!.holds[kinds.get(tree.atomic(elements))!] === 1,
            );
          }),
          options(25),
        );
      });

      itObeysTheLaws(carrier, 3);
    },
  );

  it("with one child each are the integer line and the half line, with steps and without order", () => {
    for (const offset of [0, 1, 2]) {
      for (const depth of [1, 2, 3]) {
        const types = new Types();
        const line = new IntegerLine({ kind: "integer-line", offset });
        const tree = new Forest(forest(1, false, offset));
        const onLine = listedTypes(line, ({ positions }) => steps(positions, offset, 0), types);
        const inTree = listedTypes(tree, signed(tree), types);
        expect(inTree(tree.empty, depth)).toBe(onLine(line.empty, depth));
      }
      for (const ends of [0, 1, 3])
        for (const depth of [1, 2, 3]) {
          const types = new Types();
          const line = new HalfLine({ kind: "half-line", offset, ends });
          const tree = new Forest(forest(1, true, offset, ends));
          const onLine = listedTypes(line, ({ positions }) => steps(positions, offset, ends), types);
          const inTree = listedTypes(tree, signed(tree), types);
          expect(inTree(tree.empty, depth)).toBe(onLine(line.empty, depth));
        }
    }

    /** Positions below `ends`, and differences up to the offset. */
    function steps(positions: readonly number[], offset: number, ends: number): string {
      const places = positions.map((position) => (position < ends ? position : "-"));
      const differences = positions.flatMap((x, i) =>
        positions.slice(i + 1).map((y) => (Math.abs(y - x) <= offset ? y - x : "-")),
      );
      return `${places.join()}|${differences.join()}`;
    }

    /** The same of a forest: the parent of x is x − 1. */
    function signed(carrier: Forest): (configuration: ForestConfiguration) => string {
      const { rooted, offset, ends } = carrier.description;
      return (configuration) => {
        const places = Array.from({ length: configuration.points - (rooted ? 1 : 0) }, (_, place) => place);
        const depths = places.map((i) => {
          const depth = carrier.depth(configuration, i);
          return depth !== null && depth < ends ? depth : "-";
        });
        const differences = places.flatMap((i) =>
          places.slice(i + 1).map((j) => {
            const between = carrier.steps(configuration, i, j);
            return between !== null && between[0] + between[1] <= offset ? between[1] - between[0] : "-";
          }),
        );
        return `${rooted ? depths.join() : places.map(() => "-").join()}|${differences.join()}`;
      };
    }
  });

  it("know what is true of parents and children", () => {
    for (const branching of [1, 2, 3]) {
      const others = ["y", "z", "u"].slice(0, branching);
      const children = (x: string) =>
        `(exists ${others.join(" ")}. ${others.map((y) => `R(${x},${y})`).join(" & ")}${others
          .flatMap((y, i) => others.slice(i + 1).map((z) => ` & ${y} != ${z}`))
          .join("")} & (forall w. R(${x},w) -> ${others.map((y) => `w = ${y}`).join(" | ")}))`;
      const facts = readSentences([
        `forall x. ${children("x")}`,
        "forall x y z. R(x,z) & R(y,z) -> x = y",
        "forall x. ~R(x,x)",
        "forall x y. ~(R(x,y) & R(y,x))",
        "forall x y z. ~(R(x,y) & R(y,z) & R(z,x))",
      ]);
      const oneRoot = readSentences(["exists x. forall y. (~(exists z. R(z,y)) <-> y = x)"])[0]!;
      const noRoot = readSentences(["forall x. exists y. R(y,x)"])[0]!;
      for (const rooted of [false, true]) {
        const structure = parenthood(new Forest(forest(branching, rooted, 1)));
        for (const fact of facts) expectIn(structure, fact, true);
        expectIn(structure, oneRoot, rooted);
        expectIn(structure, noRoot, !rooted);
      }
    }
  });

  it("are models of collected axioms that have infinite models only", () => {
    for (const axiom of axiomsOf("io-33"))
      for (const rooted of [false, true]) expectIn(parenthood(new Forest(forest(2, rooted, 1))), axiom, true);
    for (const axiom of axiomsOf("io-79")) expectIn(parenthood(new Forest(forest(2, true, 1))), axiom, true);
    // Of io-79 only the third axiom speaks of a root, and only the second of two children.
    const holdIn = (structure: Structure) =>
      axiomsOf("io-79").map((axiom) => satisfies(structure, axiom, new Meter(1e6)));
    expect(holdIn(parenthood(new Forest(forest(2, false, 1))))).toEqual([true, true, false, true, true]);
    expect(holdIn(parenthood(new Forest(forest(3, true, 1))))).toEqual([true, false, true, true, true]);
  });

  /** R holds from each element to its children. */
  function parenthood(carrier: Forest): Structure {
    const entries = carrier.kindExamples(2).map((example) => {
      const between = carrier.steps(example, 0, 1);
      return between !== null && between[0] === 0 && between[1] === 1 ? 1 : 0;
    });
    return { carrier, tables: new Map([["R", { relation: R, holds: Uint8Array.from(entries) }]]) };
  }
});

/** The laws of `Carrier` that do not speak of truth. */
function itObeysTheLaws<Configuration>(carrier: Carrier<Configuration>, depth: number): void {
  it(`obeys the laws of carriers with ${depth} quantifiers`, () => {
    for (let named = 0; named <= depth; named += 1) {
      const toCome = depth - named;
      const all = configurations(carrier, named, depth);
      const step = Math.max(1, Math.floor(all.length / 300));
      const byKey = new Map<string | number, string>();
      for (let at = 0; at < all.length; at += step) {
        const configuration = all[at]!;
        const places = Array.from({ length: named }, (_, place) => place);
        // Any order and repeats; kinds do not depend on how a tuple was reached.
        const chosen = [...places].reverse().concat(places.slice(0, 1)).slice(0, 3);
        const kind = carrier.kindOf(configuration, chosen);
        const restricted = carrier.restrict(configuration, chosen);
        expect(carrier.kindOf(restricted, [...chosen.keys()])).toBe(kind);
        expect(kind).toBeLessThan(carrier.kindCount(chosen.length));
        for (const [i, place] of chosen.entries())
          for (const [j, other] of chosen.entries())
            expect(carrier.same(restricted, i, j)).toBe(carrier.same(configuration, place, other));
        if (named > 0) expect(carrier.same(configuration, named - 1, named - 1)).toBe(true);
        // What has the same key has the same kinds, and the same key for less to come.
        const said = [
          ...places.flatMap((i) => places.map((j) => carrier.kindOf(configuration, [i, j]))),
          ...Array.from({ length: toCome }, (_, less) => carrier.key(configuration, less)),
        ].join("|");
        const key = carrier.key(configuration, toCome);
        expect(byKey.get(key) ?? said).toBe(said);
        byKey.set(key, said);
        if (toCome === 0) continue;
        const extensions = carrier.extensions(configuration, toCome - 1);
        expect(extensions.length).toBeGreaterThan(0);
        expect(extensions.length).toBeLessThanOrEqual(carrier.mostExtensions(named, toCome - 1));
        const keys = extensions.map((extended) => carrier.key(extended, toCome - 1));
        expect(new Set(keys).size).toBe(keys.length);
        // The elements named before stay as they were.
        for (const extended of extensions)
          expect(carrier.key(carrier.restrict(extended, places), toCome - 1)).toBe(
            carrier.key(configuration, toCome - 1),
          );
      }
    }
  });
}

function axiomsOf(id: string): Formula[] {
  return readSentences(infiniteOnly.find((entry) => entry.id === id)!.axioms);
}

/** Sentences with at most so many quantifiers one inside another. */
function ofDepth(depth: number, relations: readonly RelationSymbol[]): fc.Arbitrary<Formula> {
  return sentences(relations, depth - 1).filter((sentence) => depthOf(sentence) <= depth);
}

/** Any tables for the relations. */
function tables(carrier: Carrier, relations: readonly RelationSymbol[]): fc.Arbitrary<Structure> {
  return fc
    .tuple(
      ...relations.map(({ places }) => {
        const length = carrier.kindCount(places);
        return fc.array(fc.integer({ min: 0, max: 1 }), { minLength: length, maxLength: length });
      }),
    )
    .map((entries) => ({
      carrier,
      tables: new Map(
        relations.map((relation, i) => [relation.name, { relation, holds: Uint8Array.from(entries[i]!) }]),
      ),
    }));
}

/** By the searches' evaluator and by the checker's. */
function expectIn(structure: Structure, sentence: Formula, expected: boolean): void {
  const meter = new Meter(1e7);
  expect(satisfies(structure, sentence, meter)).toBe(expected);
  expect(isTrueIn(recordStructure(structure), recordFormula(sentence), meter)).toBe(expected);
}

function expectTruth<Element>(
  structure: Structure,
  sentence: Formula,
  tree: TrueTree<Element>,
  holds: (relation: RelationSymbol, elements: readonly Element[]) => boolean,
): void {
  expectIn(structure, sentence, isTrueOfTree(tree, sentence, holds));
}
