import type { ForestDescription } from "../logic/structure-definition.ts";
import { boundOf } from "./gaps.ts";
import { Listed } from "./listed.ts";

/**
 * Elements of a forest that have been named. Its points are the elements in the order of naming; in a rooted forest point
 * 0 is the root, whether it has been named or not, and the elements follow.
 */
export interface ForestConfiguration {
  /** How many points. */
  readonly points: number;
  /**
   * At `i · points + j`, for points i and j, the steps up from i to the nearest common ancestor of both; −1 where they are
   * farther apart than need be known. The steps down from there to j are the steps up from j. Below, an element is an
   * ancestor of itself, and the distance of two is the sum of both numbers.
   */
  readonly up: readonly number[];
}

/**
 * The tree in which every element has one parent and k = `branching` children; or, rooted, one in which all elements but
 * one have a parent. Any two elements have a common ancestor. (With further trees without a root beside it the same
 * sentences would hold: no finite number of quantifiers tells another tree from a place far away.) With D = `offset`, a
 * kind of pairs gives the steps up and down between two elements that have a distance of at most D, and whether they have.
 * Rooted, a kind also gives the depth of an element, its distance from the root, if that is less than `ends`. Kinds of longer
 * tuples give this for all their elements and pairs.
 *
 * Why the extensions suffice: elements that are far apart do not know of each other (Hanf 1965, Gaifman 1982); with
 * numbers, by the game of Fraïssé 1954 and Ehrenfeucht 1961. Let
 * - T(0) = D and T(r + 1) = 2 · T(r), so T(r) = 2^r · D;
 * - S(0) = ends − 1 and S(r + 1) = S(r) + T(r), so S(r) = ends − 1 + (2^r − 1) · D. Without a root, there is no S.
 *
 * Join two elements of a tuple if their distance is at most T(r), and an element and the root if its depth is at most
 * S(r). The tuple falls into components, of which one contains the root. Call two tuples of the same length alike for r
 * when their components are the same and, within each (the root included), so are the steps up and down between any two.
 *
 * 1. Alike for 0 means of the same kind, and then so are all tuples of their elements. Alike for r + 1 is alike for r.
 * 2. If tuples a and b are alike for r + 1, then for each element x there is a y so that a with x and b with y are alike for r.
 *    Write T, S for T(r), S(r).
 *    - First let there be an element of a within T of x, or let x have a depth of at most S. All elements within T of x lie in
 *      one component C: two of them are within 2T of each other; and if x is within S of the root too, their depth is
 *      at most S + T, so that C is the component of the root. Let C′ be the same component of b. Where it contains the root
 *      there is a y that lies to the elements and the root in C′ as x does to those in C; otherwise there is a y that does
 *      if x is within T of an element of C: both by the lemma below. The elements of b within T of y lie in C′ by the same
 *      argument, since those of C′ within T of y are in the places of those within T of x. If C contains the root, the
 *      depths of x and y are equal. If not, x and y lie within T of elements whose depth is more than S + T: both depths are
 *      more than S. So a with x and b with y are joined in the same way for r; the component of x is part of C and x, that of
 *      y part of C′ and y, with the same steps; and the others have not changed or have fallen apart in the same way.
 *    - Otherwise x is a component of its own. There are elements of any depth, so there are some that are as far as one
 *      likes from all of b and from the root: let y be one of them.
 * 3. Hence tuples that are alike for r satisfy the same formulas with r quantifiers one inside another, by induction on r.
 *    It is enough to list one extension for every class of extensions that are alike for r: those of the lemma for each
 *    component, and one far from everything. The steps within the components are all that this takes; with nothing to come,
 *    those between elements that are joined, since kinds give no others.
 *
 * Lemma. Let C and C′ be components as above, with the same steps. Call what is an ancestor of an element of C a node. Let x
 * be within T of an element c of C, or let C contain the root. Let w be the lowest node that is an ancestor of x: h steps
 * above an element d of C, say. Either x = w, or x lies e > 0 steps below w by way of a child of w that is no node. Then there
 * is a w′ that lies h steps above the element d′ in the place of d. For if w is not above all of C, w lies on the way from
 * d to its nearest common ancestor with another element, and w′ on the same way in C′; nor is there anything to show if the
 * root is in C. Otherwise w is at most T steps above c, and c′ in its place has so many ancestors, since its depth is more
 * than S(r + 1) = S + T ≥ T − 1; w′ is so many steps above c′. Steps say which nodes are equal and how many children of a
 * node are nodes, so it is the same number for w and w′; if it is k there is no such x, and if it is less, w′ has a child that
 * is no node, and e steps below it (any way down will do) there is a y. The steps between x and an element of C are those
 * between w and that element, with e added on the side of x; the same goes for y. Neither depends on the way down from w, so
 * a node w that is as near as required and the number e give an extension, and all extensions near C are these.
 *
 * T cannot be less for D = 1: that two elements have a distance of 2^r in a line of descent can be said with r quantifiers.
 * With k = 1 the tree is the integer line with the successor, and rooted it is the half line.
 */
export class Forest extends Listed<ForestConfiguration> {
  readonly description: ForestDescription;
  readonly empty: ForestConfiguration;
  /** Where in a configuration the elements begin: 1 in a rooted forest, else 0. */
  readonly #first: 0 | 1;

  constructor(description: ForestDescription) {
    super();
    this.description = description;
    this.#first = description.rooted ? 1 : 0;
    this.empty = description.rooted ? { points: 1, up: [0] } : { points: 0, up: [] };
  }

  /** The steps from one element up to the nearest common ancestor and down to the other; null where that is not known. */
  steps({ points, up }: ForestConfiguration, from: number, to: number): readonly [number, number] | null {
    const [i, j] = [from + this.#first, to + this.#first];
    const steps = up[i * points + j]!;
    return steps < 0 ? null : [steps, up[j * points + i]!];
  }

  /** The distance of an element from the root; null where that is not known. */
  depth({ points, up }: ForestConfiguration, place: number): number | null {
    const steps = this.#first === 1 ? up[(place + 1) * points]! : -1;
    return steps < 0 ? null : steps;
  }

  protected list(configuration: ForestConfiguration, toCome: number): readonly ForestConfiguration[] {
    const cut = this.#cut(configuration, toCome + 1);
    const extensions = new Map<string, ForestConfiguration>();
    const add = (node: Node, deep: number): void => {
      const extended = this.#cut(extend(cut, node, deep), toCome);
      const name = extended.up.join();
      if (!extensions.has(name)) extensions.set(name, extended);
    };
    for (const component of componentsOf(cut))
      for (const node of this.#nodesNear(cut, component, toCome)) {
        add(node, 0);
        if (node.children === this.description.branching) continue;
        for (let deep = 1; this.#isNear(node, component, deep, toCome); deep += 1) add(node, deep);
      }
    const none = new Array<number>(cut.points).fill(-1);
    add({ up: none, upToNode: none, children: 0 }, 0);
    return [...extensions.values()];
  }

  /** The nodes of a component that are near enough to one of its points for extensions to be listed. */
  #nodesNear(configuration: ForestConfiguration, component: readonly number[], toCome: number): Node[] {
    const { points, up } = configuration;
    const near: Node[] = [];
    component.forEach((point, index) => {
      // The nodes above this point and above none before it. All are those when it is the first and there is no root.
      const others = component.slice(0, index).map((other) => up[point * points + other]!);
      const highest =
        index > 0
          ? Math.min(...others) - 1
          : point < this.#first
            ? 0
            : this.#near(toCome) + Math.max(...component.map((other) => up[point * points + other]!));
      for (let height = 0; height <= highest; height += 1) {
        const node = nodeAbove(configuration, component, point, height);
        if (this.#isNear(node, component, 0, toCome)) near.push(node);
      }
    });
    return near;
  }

  /** Whether what lies so many steps below a node, by a way of its own, is near a point of the component. */
  #isNear({ up, upToNode }: Node, component: readonly number[], deep: number, toCome: number): boolean {
    return component.some(
      (point) =>
        deep + up[point]! + upToNode[point]! <=
        (point < this.#first ? this.#nearRoot(toCome) : this.#near(toCome)),
    );
  }

  restrict({ points, up }: ForestConfiguration, places: readonly number[]): ForestConfiguration {
    const kept = places.map((place) => place + this.#first);
    if (this.#first === 1) kept.unshift(0);
    return { points: kept.length, up: kept.flatMap((i) => kept.map((j) => up[i * points + j]!)) };
  }

  same({ points, up }: ForestConfiguration, first: number, second: number): boolean {
    const [i, j] = [first + this.#first, second + this.#first];
    return up[i * points + j] === 0 && up[j * points + i] === 0;
  }

  key(configuration: ForestConfiguration, toCome: number): string {
    return this.#cut(configuration, toCome).up.join();
  }

  protected kindName(configuration: ForestConfiguration): string {
    return this.key(configuration, 0);
  }

  /**
   * Count the nodes within T of an element, each with the number of ways T − distance + 1 to go down from it. Give each node to
   * an element that is nearest. The nodes of one element are a connected piece of the tree; at each distance from 1 on
   * there are at most as many as there are edges out of the piece. The pieces of n elements form a tree, so they have 2n − 2
   * such edges, and one more upwards: in all n · (T + 1) + (2n − 1) · T(T + 1)/2 ways. Likewise from the root: one node at
   * distance 0, at most n at others. With one child each, there are 2T + 1 elements within T of one.
   */
  mostExtensions(named: number, toCome: number): number {
    const near = this.#near(toCome);
    const nearRoot = this.#nearRoot(toCome);
    if (this.description.branching === 1) return boundOf(1 + named * (2 * near + 1) + nearRoot + 1);
    const nearElements = named === 0 ? 0 : named * (near + 1) + (2 * named - 1) * below(near);
    return boundOf(1 + nearElements + nearRoot + 1 + named * below(nearRoot));
  }

  /** T(toCome). */
  #near(toCome: number): number {
    return this.description.offset * 2 ** toCome;
  }

  /** S(toCome); −1 when there is no root, so that nothing is near it. */
  #nearRoot(toCome: number): number {
    const { rooted, ends, offset } = this.description;
    return rooted ? ends - 1 + offset * (2 ** toCome - 1) : -1;
  }

  /**
   * The configuration without steps between components for so many quantifiers to come. With none to come, kinds are all
   * that counts, so it is without steps between any two points that are not joined.
   */
  #cut(configuration: ForestConfiguration, toCome: number): ForestConfiguration {
    const { points, up } = configuration;
    const near = this.#near(toCome);
    const nearRoot = this.#nearRoot(toCome);
    // For each point the least point of its component; with nothing to come, only whether two points are joined.
    const component = Array.from({ length: points }, (_, point) => point);
    const cut = up.slice();
    let changed = false;
    const separate = (i: number, j: number): void => {
      if (cut[i * points + j]! >= 0) changed = true;
      cut[i * points + j] = -1;
      cut[j * points + i] = -1;
    };
    for (let i = 0; i < points; i += 1)
      for (let j = i + 1; j < points; j += 1) {
        const from = up[i * points + j]!;
        const joined = from >= 0 && from + up[j * points + i]! <= (i < this.#first ? nearRoot : near);
        if (toCome === 0) {
          if (!joined) separate(i, j);
        } else if (joined && component[i] !== component[j]) {
          const [kept, gone] = [component[i]!, component[j]!];
          for (let point = 0; point < points; point += 1)
            if (component[point] === gone) component[point] = kept;
        }
      }
    if (toCome > 0)
      for (let i = 0; i < points; i += 1)
        for (let j = i + 1; j < points; j += 1) if (component[i] !== component[j]) separate(i, j);
    return changed ? { points, up: cut } : configuration;
  }
}

/** An ancestor of a point of a component. */
interface Node {
  /** For each point of the component the steps up from the node to the nearest common ancestor; −1 for other points. */
  readonly up: readonly number[];
  /** The same from the point. */
  readonly upToNode: readonly number[];
  /** How many of its children are ancestors of points of the component. */
  readonly children: number;
}

function nodeAbove(
  { points, up }: ForestConfiguration,
  component: readonly number[],
  point: number,
  height: number,
): Node {
  const upFromNode = new Array<number>(points).fill(-1);
  const upToNode = upFromNode.slice();
  const below: number[] = [];
  for (const other of component) {
    const rise = up[point * points + other]!;
    upFromNode[other] = Math.max(0, rise - height);
    upToNode[other] = up[other * points + point]! + Math.max(0, height - rise);
    if (upFromNode[other] === 0 && upToNode[other]! > 0) below.push(other);
  }
  // Two points are below the same child when their nearest common ancestor is.
  const children = below.filter(
    (other, index) =>
      !below.slice(0, index).some((before) => up[other * points + before]! < upToNode[other]!),
  );
  return { up: upFromNode, upToNode, children: children.length };
}

/** The configuration with one point more: so many steps below a node, by a way of its own. */
function extend({ points, up }: ForestConfiguration, node: Node, deep: number): ForestConfiguration {
  const longer: number[] = [];
  for (let point = 0; point < points; point += 1)
    longer.push(...up.slice(point * points, (point + 1) * points), node.upToNode[point]!);
  longer.push(...node.up.map((steps) => (steps < 0 ? -1 : steps + deep)), 0);
  return { points: points + 1, up: longer };
}

/** The points that have steps between them, in ascending order. */
function componentsOf({ points, up }: ForestConfiguration): readonly (readonly number[])[] {
  const all = Array.from({ length: points }, (_, point) => point);
  return all
    .map((point) => all.filter((other) => up[point * points + other]! >= 0))
    .filter((component, point) => component[0] === point);
}

/** Ways down from the nodes at distances from 1 on, one at each: 1 + … + distance. */
function below(distance: number): number {
  return (distance * (distance + 1)) / 2;
}
