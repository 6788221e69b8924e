/**
 * What definitions may say of the elements of trees: `x < y`, `x ≤ y`, `x = y` and `meet(x, y)` on the dense tree; `=`
 * between elements and their parents, parents of parents and so on in a forest, and in a rooted one `x = 0` for "x is the
 * root" and `x = n` for "x is n steps from the root".
 *
 * Steps are counted beyond the root, as they are beyond 0 on the half line: its parent is no element, and equal to none.
 * So `parent(x) = parent(y)` says that x and y are the same or have the same parent, the root included.
 */
import type { CarrierAtom, ElementTerm } from "../../logic/structure-definition.ts";
import { type DenseTree, meetOfNodes, type TreeConfiguration } from "../dense-tree.ts";
import type { Forest, ForestConfiguration } from "../forest.ts";
import {
  apply,
  asComparison,
  type Comparison,
  compare,
  complain,
  type Element,
  element,
  firstComplaint,
  labelComplaint,
  number,
  type Operation,
  pairsOf,
  pathComplaint,
  unsettled,
  writeComparison,
  writeTerm,
} from "./terms.ts";
import type { Complaint, Vocabulary } from "./vocabulary.ts";

/** The vocabulary of the dense tree. */
export function denseTreeVocabulary(_carrier: DenseTree): Vocabulary<TreeConfiguration> {
  return {
    complaint(atom) {
      if (atom.kind !== "compare") return wrongAtom(atom, "the dense tree", "x < y");
      return firstComplaint(atom, onDenseTree);
    },
    holds(atom, configuration, place) {
      const { left, relation, right } = asComparison(atom);
      const [first, second] = [left, right].map((term) => nodeOf(term, configuration, place)) as [
        number,
        number,
      ];
      if (first === second) return relation !== "<";
      return relation !== "=" && meetOfNodes(configuration, first, second) === first;
    },
    // Which meets are equal, and which is below which, follows from which elements they are below: and that of two is
    // below a third if and only if the meet is.
    atoms(variables) {
      const elements = variables.map(element);
      const orders = pairsOf(elements).flatMap(([x, y]) => [
        compare(x, "<", y),
        compare(y, "<", x),
        compare(x, "=", y),
      ]);
      const meets = elements.flatMap((z) =>
        pairsOf(elements.filter((x) => x !== z)).map(([x, y]) => compare(apply("meet", x, y), "≤", z)),
      );
      return [...orders, ...meets];
    },
  };
}

/** The vocabulary of a forest. */
export function forestVocabulary(carrier: Forest): Vocabulary<ForestConfiguration> {
  const { branching, rooted, offset } = carrier.description;
  const ends = rooted ? carrier.description.ends : 0;
  return {
    complaint(atom) {
      if (atom.kind !== "compare") return wrongAtom(atom, "a forest", "parent(y) = x");
      const wrong = firstComplaint(atom, (term) => inForest(term, rooted));
      if (wrong !== null) return wrong;
      if (atom.relation !== "=")
        return complain(
          `a forest has parents and no order, so \`${writeComparison(atom)}\` says nothing there`,
          "`parent(y) = x`, or the dense tree, where elements are compared",
        );
      if (atom.left.kind === "number" && atom.right.kind === "number")
        return complain(`\`${writeComparison(atom)}\` says nothing of an element`, "`x = 0`, of an element");
      return boundsComplaint(atom, offset, ends);
    },
    holds(atom, configuration, place) {
      const { left, right } = asComparison(atom);
      if (left.kind === "number") return isAtDepth(carrier, right, left.value, configuration, place);
      if (right.kind === "number") return isAtDepth(carrier, left, right.value, configuration, place);
      const [first, second] = [climbOf(left), climbOf(right)];
      const steps = carrier.steps(configuration, place(first.from.variable), place(second.from.variable));
      // So many steps above both their ways are one. Where steps are not known they are more than the atom speaks of.
      return steps !== null && first.steps >= steps[0] && first.steps - steps[0] === second.steps - steps[1];
    },
    atoms(variables) {
      const elements = variables.map(element);
      const atoms: CarrierAtom[] = [];
      for (let size = 0; size <= Math.max(offset, ends - 1); size += 1) {
        if (size <= offset)
          for (const [x, y] of pairsOf(elements))
            for (let back = 0; back <= size; back += 1) {
              const forth = size - back;
              // With one child each, a common ancestor is one of the two.
              if (branching === 1 && back > 0 && forth > 0) continue;
              atoms.push(
                forth > 0 || back === 0
                  ? compare(ancestor(x, forth), "=", ancestor(y, back))
                  : compare(ancestor(y, back), "=", x),
              );
            }
        if (size < ends) for (const x of elements) atoms.push(compare(x, "=", number(size)));
      }
      return atoms;
    },
  };
}

/**
 * The least offset and ends of a forest with which each of the atoms is decided by kinds. Atoms that say nothing in a
 * forest need none. Elements of components are taken as they stand, so that definitions on carriers made of forests can
 * be asked about too.
 */
export function neededForestBounds(atoms: readonly CarrierAtom[]): {
  readonly offset: number;
  readonly ends: number;
} {
  let [offset, ends] = [0, 0];
  for (const atom of atoms) {
    if (atom.kind !== "compare") continue;
    const needed = needsOf(atom);
    offset = Math.max(offset, needed.offset);
    ends = Math.max(ends, needed.ends);
  }
  return { offset, ends };
}

/** `parent` so many times of an element. */
interface Climb {
  readonly from: Element;
  readonly steps: number;
}

/**
 * Kinds tell whether an element has the depth n when n < ends, and whether two climbs meet when together they are no longer
 * than the offset.
 */
function needsOf({ left, right }: Comparison): { readonly offset: number; readonly ends: number } {
  const nothing = { offset: 0, ends: 0 };
  const [first, second] = [left, right].map((term) => (isClimb(term) ? climbOf(term) : null));
  if (first && second) {
    const same =
      first.from.variable === second.from.variable && first.from.path.join() === second.from.path.join();
    return same ? nothing : { offset: first.steps + second.steps, ends: 0 };
  }
  const climb = first ?? second;
  const value = left.kind === "number" ? left.value : right.kind === "number" ? right.value : null;
  return climb && value !== null ? { offset: 0, ends: climb.steps + value + 1 } : nothing;
}

function boundsComplaint(atom: Comparison, offset: number, ends: number): Complaint | null {
  const needed = needsOf(atom);
  const tooFew = (told: string, needs: number): Complaint =>
    unsettled(
      `this forest tells elements apart that are ${told}, and \`${writeComparison(atom)}\` needs ${stepsOf(needs)}`,
    );
  if (needed.offset > offset) return tooFew(`at most ${stepsOf(offset)} from each other`, needed.offset);
  if (needed.ends > ends) return tooFew(`less than ${stepsOf(ends)} from the root`, needed.ends);
  return null;
}

function stepsOf(count: number): string {
  return count === 1 ? "1 step" : `${count} steps`;
}

function onDenseTree(term: ElementTerm): Complaint | null {
  switch (term.kind) {
    case "element":
      return pathComplaint(term, "the dense tree");
    case "number":
      return complain(
        `the dense tree looks the same from every element, so the number ${term.value} says nothing there`,
        "a comparison of two elements, as in `x < y`",
      );
    case "shift":
      return complain(
        `the dense tree has no next elements, so \`${writeTerm(term)}\` says nothing there`,
        "a comparison without steps, as in `x < y`",
      );
    case "apply":
      if (term.name === "parent")
        return complain(
          `elements of the dense tree have no parents, so \`${writeTerm(term)}\` says nothing there`,
          "`x < y`, or a forest, where elements have parents",
        );
      return operationComplaint(term, "meet", 2, "the dense tree") ?? argsComplaint(term, onDenseTree);
  }
}

function inForest(term: ElementTerm, rooted: boolean): Complaint | null {
  if (term.kind !== "number") return ofElement(term);
  if (!rooted)
    return complain(
      `this forest looks the same from every element, so the number ${term.value} says nothing there`,
      "a rooted forest, where `x = 0` says that x is the root",
    );
  if (term.value < 0)
    return complain(
      `elements are 0 steps from the root or more, and not ${term.value}`,
      "a number from 0 on",
    );
  return null;
}

/** What is wrong with a term of a forest that should be an element or an ancestor of one. */
function ofElement(term: ElementTerm): Complaint | null {
  switch (term.kind) {
    case "element":
      return pathComplaint(term, "a forest");
    case "number":
      return complain(
        `\`parent\` is said of elements, and not of the number ${term.value}`,
        "`parent(x) = 0`, where x is one step from the root",
      );
    case "shift":
      return complain(
        `a forest has no next elements, so \`${writeTerm(term)}\` says nothing there`,
        "`parent(x)`, the element one step up",
      );
    case "apply":
      if (term.name === "meet")
        return complain(
          "`meet` says nothing in a forest, where common ancestors may be too far to be told",
          "`parent(x) = parent(y)`, or the dense tree",
        );
      return operationComplaint(term, "parent", 1, "a forest") ?? argsComplaint(term, ofElement);
  }
}

function argsComplaint(
  { args }: Operation,
  complaint: (term: ElementTerm) => Complaint | null,
): Complaint | null {
  for (const term of args) {
    const found = complaint(term);
    if (found !== null) return found;
  }
  return null;
}

/** @param only the operation that there is, which takes so many terms */
function operationComplaint(
  { name, args }: Operation,
  only: "meet" | "parent",
  operands: 1 | 2,
  where: string,
): Complaint | null {
  const form = only === "meet" ? "`meet(x, y)`" : "`parent(x)`";
  if (name !== only) return complain(`\`${name}\` says nothing in ${where}`, form);
  if (args.length === operands) return null;
  return complain(
    `\`${name}\` takes ${operands === 1 ? "one term" : "two terms"}, and not ${args.length}`,
    form,
  );
}

function wrongAtom(atom: Exclude<CarrierAtom, Comparison>, where: string, example: string): Complaint {
  if (atom.kind === "holds") return complain(`\`${atom.name}\` says nothing in ${where}`, `\`${example}\``);
  return labelComplaint(atom.name, where, `\`${example}\``);
}

function nodeOf(
  term: ElementTerm,
  configuration: TreeConfiguration,
  place: (variable: string) => number,
): number {
  if (term.kind === "element") return configuration.nodes[place(term.variable)]!;
  if (term.kind !== "apply") throw new Error(`a ${term.kind} on the dense tree`);
  return term.args
    .map((part) => nodeOf(part, configuration, place))
    .reduce((first, second) => meetOfNodes(configuration, first, second));
}

function isAtDepth(
  carrier: Forest,
  term: ElementTerm,
  depth: number,
  configuration: ForestConfiguration,
  place: (variable: string) => number,
): boolean {
  const { from, steps } = climbOf(term);
  return carrier.depth(configuration, place(from.variable)) === steps + depth;
}

function isClimb(term: ElementTerm): boolean {
  return (
    term.kind === "element" ||
    (term.kind === "apply" && term.name === "parent" && term.args.length === 1 && isClimb(term.args[0]!))
  );
}

function climbOf(term: ElementTerm): Climb {
  if (term.kind === "element") return { from: term, steps: 0 };
  if (term.kind !== "apply") throw new Error(`a ${term.kind} in a forest`);
  const { from, steps } = climbOf(term.args[0]!);
  return { from, steps: steps + 1 };
}

function ancestor(of: ElementTerm, steps: number): ElementTerm {
  return steps === 0 ? of : apply("parent", ancestor(of, steps - 1));
}
