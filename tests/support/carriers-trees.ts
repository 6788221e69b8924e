/**
 * Trees by definition, for tests of the carriers on trees: their true elements, and what formulas of a depth say of
 * them, found by walking over all elements of a neighbourhood.
 */
import type { Carrier } from "../../lib/carriers/carrier.ts";
import type { Forest, ForestConfiguration } from "../../lib/carriers/forest.ts";
import { type Formula, freeVariables, type RelationSymbol } from "../../lib/logic/formula.ts";
import type { ForestDescription } from "../../lib/logic/structure-definition.ts";

/** Elements of a tree; what a table may tell of them; and, for a tuple, elements that stand for all others. */
export interface TrueTree<Element> {
  /** What kinds tell of a tuple, from their definition: the same for tuples of the same kinds, and for no others. */
  readonly atomic: (elements: readonly Element[]) => string;
  /** Elements that stand for all others with so many quantifiers to come after the one that takes them. */
  readonly window: (elements: readonly Element[], toCome: number) => readonly Element[];
  /** A name that two tuples share only if an automorphism of the tree takes one to the other. */
  readonly orbit: (elements: readonly Element[]) => string;
  readonly isSame: (x: Element, y: Element) => boolean;
}

/** Numbers what formulas of a depth say, so that true and listed tuples can be compared. */
export class Types {
  readonly #numbers = new Map<string, number>();

  of(name: string): number {
    let number = this.#numbers.get(name);
    if (number === undefined) {
      number = this.#numbers.size;
      this.#numbers.set(name, number);
    }
    return number;
  }

  ofAll(parts: Iterable<number>): number {
    return this.of(`{${[...new Set(parts)].sort((a, b) => a - b).join()}}`);
  }
}

/**
 * The type of a tuple (Ehrenfeucht 1961, Fraïssé 1954): of depth 0 what a table tells, of depth r + 1 the set of the types of
 * depth r of all tuples with one element more. Two tuples satisfy the same formulas of a depth if and only if their types
 * are the same.
 */
export function trueTypes<Element>(
  tree: TrueTree<Element>,
  types: Types,
): (elements: readonly Element[], depth: number) => number {
  const known = new Map<string, number>();
  const typeOf = (elements: readonly Element[], depth: number): number => {
    if (depth === 0) return types.of(tree.atomic(elements));
    const key = `${depth}|${tree.orbit(elements)}`;
    let type = known.get(key);
    if (type === undefined) {
      const window = tree.window(elements, depth - 1);
      type = types.ofAll(window.map((element) => typeOf([...elements, element], depth - 1)));
      known.set(key, type);
    }
    return type;
  };
  return typeOf;
}

/** The same, walking over what a carrier lists. */
export function listedTypes<Configuration>(
  carrier: Carrier<Configuration>,
  atomic: (configuration: Configuration) => string,
  types: Types,
): (configuration: Configuration, depth: number) => number {
  const typeOf = (configuration: Configuration, depth: number): number =>
    depth === 0
      ? types.of(atomic(configuration))
      : types.ofAll(
          carrier.extensions(configuration, depth - 1).map((extended) => typeOf(extended, depth - 1)),
        );
  return typeOf;
}

// The dense tree.

/**
 * An element of the dense tree. One starts on the main line and goes up through the rational heights; at the height of
 * each turn one leaves the line one is on for the branch with that number, from 1. Turns have ascending heights, all less
 * than the height at which one stops.
 */
export interface Place {
  readonly turns: readonly (readonly [height: number, branch: number])[];
  readonly height: number;
}

/** The greatest common lower bound: where the ways part, or where the shorter one stops. */
export function meet(x: Place, y: Place): Place {
  let shared = 0;
  while (
    shared < x.turns.length &&
    shared < y.turns.length &&
    x.turns[shared]![0] === y.turns[shared]![0] &&
    x.turns[shared]![1] === y.turns[shared]![1]
  )
    shared += 1;
  const height = Math.min(
    x.turns[shared]?.[0] ?? x.height,
    y.turns[shared]?.[0] ?? y.height,
    x.height,
    y.height,
  );
  return { turns: x.turns.slice(0, shared), height };
}

export function isAtOrBelow(x: Place, y: Place): boolean {
  const { turns, height } = meet(x, y);
  return height === x.height && turns.length === x.turns.length;
}

/** Which meets of two elements are at or below which others. */
export function orderOfMeets(elements: readonly Place[]): string {
  const meets = elements.flatMap((x, i) => elements.slice(i).map((y) => meet(x, y)));
  return meets.map((x) => meets.map((y) => (isAtOrBelow(x, y) ? "1" : "0")).join("")).join();
}

/** The same for a configuration of the carrier, whose nodes and parents are given. */
export function orderOfNodes(nodes: readonly number[], parents: readonly number[]): string {
  const downFrom = (node: number): number[] => (node < 0 ? [] : [node, ...downFrom(parents[node]!)]);
  const meets = nodes.flatMap((x, i) =>
    nodes.slice(i).map((y) => downFrom(x).find((node) => downFrom(y).includes(node))!),
  );
  return meets.map((x) => meets.map((y) => (downFrom(y).includes(x) ? "1" : "0")).join("")).join();
}

/**
 * Along the way to each element and straight on above it, at all heights where something is, between those, below and
 * above: the place, and the beginnings of all branches that are in use, and of one that is not.
 */
export function placesAround(elements: readonly Place[]): readonly Place[] {
  if (elements.length === 0) return [{ turns: [], height: 0 }];
  const heights = [...new Set(elements.flatMap((x) => elements.map((y) => meet(x, y).height)))].sort(
    (a, b) => a - b,
  );
  const grid: number[] = [heights[0]! - 2, heights[0]! - 1];
  heights.forEach((height, i) => {
    const next = heights[i + 1] ?? height + 4;
    grid.push(height, height + (next - height) / 4, height + (next - height) / 2);
  });
  const branches = Math.max(0, ...elements.flatMap(({ turns }) => turns.map(([, branch]) => branch))) + 1;
  const found = new Map<string, Place>();
  const add = (place: Place) => found.set(JSON.stringify(place), place);
  for (const { turns } of elements)
    for (const height of grid) {
      const before = turns.filter(([turned]) => turned < height);
      add({ turns: before, height });
      for (let branch = 1; branch <= branches; branch += 1)
        add({ turns: [...before, [height, branch]], height: height + 1 / 1024 });
    }
  return [...found.values()];
}

export const denseTree: TrueTree<Place> = {
  atomic: orderOfMeets,
  window: placesAround,
  orbit: (elements) => JSON.stringify(elements),
  isSame: (x, y) => isAtOrBelow(x, y) && isAtOrBelow(y, x),
};

// Regular forests.

/**
 * An element of a regular tree: its level, which grows away from the root, and the numbers of the children by which one
 * comes down to it. Without a root, levels go on to −∞, and so do the numbers, which are 0 from some place on; those zeros
 * are left out.
 */
export interface Twig {
  readonly level: number;
  readonly digits: string;
}

export interface TwigTree {
  readonly branching: number;
  readonly rooted: boolean;
}

export function parentOf({ rooted }: TwigTree, { level, digits }: Twig): Twig | null {
  if (rooted && level === 0) return null;
  return { level: level - 1, digits: digits.slice(0, -1) };
}

export function childrenOf({ branching, rooted }: TwigTree, { level, digits }: Twig): readonly Twig[] {
  return Array.from({ length: branching }, (_, child) => ({
    level: level + 1,
    digits: !rooted && child === 0 && digits === "" ? "" : `${digits}${child}`,
  }));
}

function nameOf({ level, digits }: Twig): string {
  return `${level}:${digits}`;
}

/** Steps up to the nearest common ancestor and down from it, by climbing from the lower one until both meet. */
export function stepsBetween(tree: TwigTree, x: Twig, y: Twig): readonly [number, number] {
  let [first, second, up, down] = [x, y, 0, 0];
  while (first.level !== second.level || first.digits !== second.digits) {
    const [climbFirst, climbSecond] = [first.level >= second.level, second.level >= first.level];
    if (climbFirst) [first, up] = [parentOf(tree, first)!, up + 1];
    if (climbSecond) [second, down] = [parentOf(tree, second)!, down + 1];
  }
  return [up, down];
}

/** All elements at most so far away. */
export function ballAround(tree: TwigTree, centre: Twig, radius: number): readonly Twig[] {
  const found = new Map([[nameOf(centre), centre]]);
  let border: readonly Twig[] = [centre];
  for (let distance = 0; distance < radius; distance += 1) {
    const next: Twig[] = [];
    for (const twig of border) {
      const parent = parentOf(tree, twig);
      for (const neighbour of [...(parent === null ? [] : [parent]), ...childrenOf(tree, twig)])
        if (!found.has(nameOf(neighbour))) {
          found.set(nameOf(neighbour), neighbour);
          next.push(neighbour);
        }
    }
    border = next;
  }
  return [...found.values()];
}

/** Levels between an element that should be far from others and the lowest of them. */
const FAR = 60;
const START: Twig = { level: 0, digits: "" };

/**
 * A regular tree whose kinds are as with this offset and ends.
 * @param wider by how many steps neighbourhoods are wider than the carrier claims to be enough
 */
export function regularTree(tree: TwigTree, offset: number, ends: number, wider: number): TrueTree<Twig> {
  const near = (toCome: number) => 2 ** toCome * offset;
  const nearRoot = (toCome: number) => ends - 1 + (2 ** toCome - 1) * offset;
  return {
    isSame: (x, y) => nameOf(x) === nameOf(y),
    atomic: (elements) => {
      const depths = elements.map(({ level }) => (tree.rooted && level < ends ? level : "-"));
      const steps = elements.flatMap((x, i) =>
        elements.slice(i + 1).map((y) => {
          const [up, down] = stepsBetween(tree, x, y);
          return up + down <= offset ? `${up},${down}` : "-";
        }),
      );
      return `${depths.join()}|${steps.join(";")}`;
    },
    window: (elements, toCome) => {
      const deepest = elements.reduce((low, next) => (next.level > low.level ? next : low), START);
      let far = deepest;
      for (let steps = 0; steps < FAR; steps += 1) far = childrenOf(tree, far).at(-1)!;
      // Without a root, all first elements are alike: an automorphism takes any to any other.
      if (elements.length === 0 && !tree.rooted) return [START];
      const all = [
        ...(tree.rooted ? ballAround(tree, START, nearRoot(toCome) + wider) : []),
        ...elements.flatMap((element) => ballAround(tree, element, near(toCome) + wider)),
        far,
      ];
      return [...new Map(all.map((twig) => [nameOf(twig), twig])).values()];
    },
    // An isomorphism of the pieces that tuples span (with the root) goes on to all children and up.
    orbit: (elements) =>
      [
        ...elements.map(({ level }) => (tree.rooted ? level : "")),
        ...elements.flatMap((x, i) => elements.slice(i + 1).map((y) => stepsBetween(tree, x, y).join())),
      ].join(";"),
  };
}

/** What kinds of a forest tell of a configuration, told by the numbers of kinds of its elements and pairs, named as above. */
export function atomicOfForest(carrier: Forest): (configuration: ForestConfiguration) => string {
  const { offset, ends } = carrier.description;
  const depthNames = carrier.kindExamples(1).map((example) => {
    const depth = carrier.depth(example, 0);
    return depth !== null && depth < ends ? depth : "-";
  });
  const stepNames = carrier.kindExamples(2).map((example) => {
    const steps = carrier.steps(example, 0, 1);
    return steps !== null && steps[0] + steps[1] <= offset ? steps.join() : "-";
  });
  return (configuration) => {
    const { points } = configuration;
    const places = Array.from({ length: points - (carrier.description.rooted ? 1 : 0) }, (_, place) => place);
    const depths = places.map((i) => depthNames[carrier.kindOf(configuration, [i])]);
    const steps = places.flatMap((i) =>
      places.slice(i + 1).map((j) => stepNames[carrier.kindOf(configuration, [i, j])]),
    );
    return `${depths.join()}|${steps.join(";")}`;
  };
}

/** Whether a sentence is true of the elements of a tree, each quantifier ranging over all elements of a window. */
export function isTrueOfTree<Element>(
  tree: TrueTree<Element>,
  sentence: Formula,
  holds: (relation: RelationSymbol, elements: readonly Element[]) => boolean,
): boolean {
  const known = new Map<Formula, Map<string, boolean>>();
  const isTrue = (formula: Formula, names: ReadonlyMap<string, Element>): boolean => {
    switch (formula.kind) {
      case "true":
        return true;
      case "false":
        return false;
      case "equal":
        return tree.isSame(names.get(formula.left)!, names.get(formula.right)!);
      case "atom":
        return holds(
          formula.relation,
          formula.args.map((variable) => names.get(variable)!),
        );
      case "not":
        return !isTrue(formula.body, names);
      case "and":
        return formula.parts.every((part) => isTrue(part, names));
      case "or":
        return formula.parts.some((part) => isTrue(part, names));
      case "implies":
        return !isTrue(formula.left, names) || isTrue(formula.right, names);
      case "iff":
        return isTrue(formula.left, names) === isTrue(formula.right, names);
      default: {
        const free = freeVariables(formula).map((variable) => names.get(variable)!);
        const { variable, body } = formula;
        const results = known.get(formula) ?? new Map<string, boolean>();
        known.set(formula, results);
        const orbit = tree.orbit(free);
        let result = results.get(orbit);
        if (result === undefined) {
          const check = (element: Element) => isTrue(body, new Map(names).set(variable, element));
          const window = tree.window(free, depthOf(body));
          result = formula.kind === "forall" ? window.every(check) : window.some(check);
          results.set(orbit, result);
        }
        return result;
      }
    }
  };
  return isTrue(sentence, new Map());
}

/** How many quantifiers lie one inside another at most. */
export function depthOf(formula: Formula): number {
  switch (formula.kind) {
    case "not":
      return depthOf(formula.body);
    case "and":
    case "or":
      return Math.max(...formula.parts.map(depthOf));
    case "implies":
    case "iff":
      return Math.max(depthOf(formula.left), depthOf(formula.right));
    case "forall":
    case "exists":
      return 1 + depthOf(formula.body);
    default:
      return 0;
  }
}

export function forest(branching: number, rooted: boolean, offset: number, ends = 0): ForestDescription {
  return { kind: "forest", branching, rooted, offset, ends };
}

/** What a forest is called in the names of tests. */
export function told({ branching, rooted, offset, ends }: ForestDescription): string {
  return `${branching} children, ${rooted ? `a root, ends ${ends}` : "no root"}, offset ${offset}`;
}
