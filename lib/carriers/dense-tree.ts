import type { DenseTreeDescription } from "../logic/structure-definition.ts";
import { Listed } from "./listed.ts";

/**
 * Elements of the tree that have been named, with the finite tree that they span: its nodes are the elements and the
 * meets of any two of them, each once.
 *
 * Nodes are numbered from 0 as they come up: for each element in the order of naming, from below, the nodes at or below
 * it that have no number yet. So a node's number is greater than its parent's, and the same tree is always numbered in
 * the same way.
 */
export interface TreeConfiguration {
  /** For each element, its node. */
  readonly nodes: readonly number[];
  /** For each node the next node below it; −1 for the least one, which is node 0. */
  readonly parents: readonly number[];
}

/**
 * The dense tree: a countable partial order in which
 * (1) what lies below an element is a chain, and any two elements x, y have a greatest common lower bound, their meet;
 * (2) there is an element between any two comparable ones, and one below each;
 * (3) above each element x and any finitely many y₁, …, yₙ > x there is z > x that has the meet x with each of them: at
 *     every element there are infinitely many branches.
 * A kind of tuples is the isomorphism type of the finite tree with meets that the tuple spans.
 *
 * There is such an order: its elements are ways that start on a line of rational heights, turn off at finitely many rising
 * heights into one of countably many branches, and stop at a height above the last turn; x ≤ y if x is where y passes. It is
 * the limit, in the sense of Fraïssé 1954, of the class of finite trees with meets, so up to isomorphism the only one that is
 * countable; Droste 1985 ("Structure of partially ordered sets with transitive automorphism groups") classified trees of this
 * sort. What is needed here is proved here, from (1) to (3).
 *
 * Why the extensions suffice. Let N be a finite set of elements that has the meet of any two of its elements, and a any
 * element. If N is empty, N ∪ {a} is one node. Otherwise let b be the greatest of the elements a ∧ v with v ∈ N: they lie
 * below a, so they form a chain.
 *
 * 1. b is a node, or lies on an edge or below the least node; and N ∪ {b} has meets. For the nodes at or above b are some, and
 *    with two of them their meet is one; so there is a least one, v. If b ≠ v and v has a next node p below it, then p and b,
 *    both below v, are comparable, and p < b by the choice of v: b lies on the edge from p to v. For w ∈ N the meet b ∧ w is b
 *    if w ≥ v; otherwise w ∧ v is a node less than v, so at most p, so less than b, and b ∧ w = w ∧ v.
 * 2. If b < a, then a ∧ w = b ∧ w for every w ∈ N ∪ {b}: by the choice of b, a ∧ w ≤ b for w ∈ N, so a ∧ w ≤ b ∧ w, and the
 *    other way round since b ≤ a; and a ∧ b = b. So a is a leaf in a branch at b in which there is no node.
 *
 * Hence N ∪ {a, b} has meets, and as a tree it is N with one of these changes: for each node v, a is v; a lies on the
 * edge below v (for the least node: anywhere below it); a is a leaf in a new branch at v; or a is a leaf in a new branch at
 * a new node on the edge below v. Each of these four occurs. By (2) every edge has an element on it and there is one below
 * the least node. By (3), with the elements of N greater than b for y₁, …, yₙ, every b has an a > b with a ∧ w = b for those
 * w; for others a ∧ w ≤ b, since both lie below a and w is not above b; so a is a leaf as in 2. Which of the four are there
 * depends only on the tree N, not on how it lies in the order.
 *
 * So if two tuples span isomorphic trees, for every a there is an a′ so that the tuples with a and with a′ span
 * isomorphic trees, and the other way round. By induction on formulas they satisfy the same ones, whatever their depth
 * (the order is homogeneous). It is enough to list the four for every node. No two of those are isomorphic over the
 * elements: they differ in what a is equal to, below or above, and in where its meets with the others lie.
 */
export class DenseTree extends Listed<TreeConfiguration> {
  readonly description: DenseTreeDescription = { kind: "dense-tree" };
  readonly empty: TreeConfiguration = { nodes: [], parents: [] };

  protected list({ nodes, parents }: TreeConfiguration): readonly TreeConfiguration[] {
    const count = parents.length;
    if (count === 0) return [{ nodes: [0], parents: [-1] }];
    const extensions: TreeConfiguration[] = [];
    for (let node = 0; node < count; node += 1) {
      // The number `count` is for the new node on the edge below, `count + 1` for a leaf in a new branch there.
      const split = [...parents, parents[node]!];
      split[node] = count;
      extensions.push(
        { nodes: [...nodes, node], parents },
        numbered([...nodes, count], split),
        numbered([...nodes, count], [...parents, node]),
        numbered([...nodes, count + 1], [...split, count]),
      );
    }
    return extensions;
  }

  restrict({ nodes, parents }: TreeConfiguration, places: readonly number[]): TreeConfiguration {
    const kept = places.map((place) => nodes[place]!);
    const named = new Set(kept);
    // From the leaves down, a node stays if an element is there or if nodes stay in two branches above it. `above` has
    // the least nodes that stay above each.
    const above: number[][] = parents.map(() => []);
    const below = parents.map(() => -1);
    for (let node = parents.length - 1; node >= 0; node -= 1) {
      const branches = above[node]!;
      const stays = named.has(node) || branches.length > 1;
      if (stays) for (const branch of branches) below[branch] = node;
      const parent = parents[node]!;
      if (parent >= 0) above[parent]!.push(...(stays ? [node] : branches));
    }
    return numbered(kept, below);
  }

  same({ nodes }: TreeConfiguration, first: number, second: number): boolean {
    return nodes[first] === nodes[second];
  }

  key({ nodes, parents }: TreeConfiguration): string {
    return `${nodes.join()};${parents.join()}`;
  }

  protected kindName(configuration: TreeConfiguration): string {
    return this.key(configuration);
  }

  /** Every element but the first brings at most two nodes. */
  mostExtensions(named: number): number {
    return named === 0 ? 1 : 4 * (2 * named - 1);
  }
}

/** The meet of two nodes: the greatest node that is at or below both. */
export function meetOfNodes({ parents }: TreeConfiguration, first: number, second: number): number {
  let [left, right] = [first, second];
  while (left !== right) {
    if (left > right) left = parents[left]!;
    else right = parents[right]!;
  }
  return left;
}

/** The configuration with its nodes numbered as they should be; nodes that are at or below no element are left out. */
function numbered(nodes: readonly number[], parents: readonly number[]): TreeConfiguration {
  const numbers = new Map<number, number>();
  const renumbered: number[] = [];
  for (const node of nodes) {
    const path: number[] = [];
    for (let next = node; next >= 0 && !numbers.has(next); next = parents[next]!) path.push(next);
    for (const next of path.reverse()) {
      const parent = parents[next]!;
      renumbered.push(parent < 0 ? -1 : numbers.get(parent)!);
      numbers.set(next, numbers.size);
    }
  }
  return { nodes: nodes.map((node) => numbers.get(node)!), parents: renumbered };
}
