/**
 * What definitions may say of the elements of homogeneous carriers: `x = y` everywhere; `adjacent(x, y)` in the generic
 * graph, `arc(x, y)` in the digraph, `beats(x, y)` in the tournament, `x < y` and `x ≤ y` in the partial order; in a Boolean
 * algebra `=`, `≤` and `<` between what is made of elements, 0 and 1 by `meet`, `join` and `co`.
 *
 * In a Boolean algebra 0, 1 and complements may be spoken of where they are not elements: a term stands for the cells
 * that lie in it, all of them for 1, and is compared by those that are not empty. So `meet(x, y) = 0` says that x and y
 * have nothing in common, with a zero or without.
 */
import { termsOf } from "../../logic/carrier-formulas.ts";
import type { CarrierAtom, ElementTerm, GenericDescription } from "../../logic/structure-definition.ts";
import type { BooleanAlgebra, BooleanConfiguration } from "../boolean-algebra.ts";
import { BOTH, between, EQUAL, FORTH, type Generic, type GenericConfiguration } from "../generic.ts";
import {
  apply,
  asComparison,
  compare,
  complain,
  element,
  firstComplaint,
  labelComplaint,
  number,
  type Operation,
  pairsOf,
  pathComplaint,
  writeComparison,
  writeTerm,
} from "./terms.ts";
import type { Complaint, Vocabulary } from "./vocabulary.ts";

/** What each class is called, and the name of its relation; null where it is written `<`. */
const CLASSES: Readonly<
  Record<
    GenericDescription["of"],
    { readonly name: string; readonly relation: "adjacent" | "arc" | "beats" | null }
  >
> = {
  graph: { name: "the generic graph", relation: "adjacent" },
  digraph: { name: "the generic digraph", relation: "arc" },
  tournament: { name: "the generic tournament", relation: "beats" },
  "partial-order": { name: "the generic partial order", relation: null },
};
const ALGEBRA = "a Boolean algebra";
/** How many terms each operation of a Boolean algebra takes. */
const OPERANDS = { meet: 2, join: 2, co: 1, parent: null } as const;

const WHERE_DEFINED = { meet: "a tree or a Boolean algebra", join: ALGEBRA, co: ALGEBRA, parent: "a forest" };

/** The vocabulary of the generic graph, digraph, tournament or partial order. */
export function genericVocabulary(carrier: Generic): Vocabulary<GenericConfiguration> {
  const { name, relation } = CLASSES[carrier.description.of];
  const example = relation === null ? "x < y" : `${relation}(x, y)`;
  return {
    complaint(atom) {
      if (atom.kind === "label") return labelComplaint(atom.name, name, `\`${example}\``);
      const wrong = firstComplaint(atom, (term) => plainComplaint(term, name, example));
      if (wrong !== null) return wrong;
      if (atom.kind === "holds") return relationComplaint(atom, name, relation);
      if (atom.relation === "=" || relation === null) return null;
      const written = writeTerms(relation, [atom.left, atom.right]);
      return complain(
        `${name} has no order, so \`${writeComparison(atom)}\` says nothing there`,
        `\`${written}\``,
      );
    },
    holds(atom, configuration, place) {
      const [first, second] = termsOf(atom).map((term) => place(variableOf(term)));
      const code = between(configuration, first!, second!);
      if (atom.kind === "holds" || (atom.kind === "compare" && atom.relation === "<"))
        return code === FORTH || code === BOTH;
      return code === EQUAL || (atom.kind === "compare" && atom.relation === "≤" && code === FORTH);
    },
    atoms(variables) {
      return pairsOf(variables).flatMap(([x, y]): CarrierAtom[] => {
        const [left, right] = [element(x), element(y)];
        const identity = compare(left, "=", right);
        if (relation === null) return [...ordersOf(left, right), identity];
        const forth: CarrierAtom = { kind: "holds", name: relation, args: [left, right] };
        const back: CarrierAtom = { kind: "holds", name: relation, args: [right, left] };
        return relation === "adjacent" ? [forth, identity] : [forth, back, identity];
      });
    },
  };
}

/** The vocabulary of the atomless Boolean algebra, with its zero and its top or without. */
export function booleanAlgebraVocabulary(carrier: BooleanAlgebra): Vocabulary<BooleanConfiguration> {
  const { zero, top } = carrier.description;
  return {
    complaint(atom) {
      if (atom.kind === "label") return labelComplaint(atom.name, ALGEBRA, "`x ≤ y`");
      if (atom.kind === "holds") return relationComplaint(atom, ALGEBRA, null);
      const wrong = firstComplaint(atom, algebraComplaint);
      if (wrong !== null) return wrong;
      if (termsOf(atom).some(hasElement)) return null;
      return complain(`\`${writeComparison(atom)}\` says nothing of an element`, "`x = 0`, of an element");
    },
    holds(atom, { cells }, place) {
      const { relation, left, right } = asComparison(atom);
      let isSmaller = false;
      for (const cell of cells) {
        const inRight = contains(right, cell, place);
        if (contains(left, cell, place) === inRight) continue;
        if (relation === "=" || !inRight) return false;
        isSmaller = true;
      }
      return relation !== "<" || isSmaller;
    },
    atoms(variables) {
      const elements = variables.map(element);
      const extremes = elements.flatMap((x) => [
        ...(zero ? [compare(x, "=", number(0))] : []),
        ...(top ? [compare(x, "=", number(1))] : []),
      ]);
      const pairs = pairsOf(elements).flatMap(([x, y]) => [
        ...ordersOf(x, y),
        compare(x, "=", y),
        compare(apply("meet", x, y), "=", number(0)),
        ...(top ? [compare(apply("join", x, y), "=", number(1))] : []),
      ]);
      const larger = subsetsOf(elements).filter((some) => some.length > 2);
      return [...extremes, ...pairs, ...larger.flatMap((some) => cellsOf(some, top))];
    },
  };
}

/** Whether a term of a Boolean algebra contains a cell. */
function contains(term: ElementTerm, cell: number, place: (variable: string) => number): boolean {
  switch (term.kind) {
    case "element":
      return ((cell >>> place(term.variable)) & 1) === 1;
    case "number":
      return term.value === 1;
    case "apply": {
      const isIn = (part: ElementTerm) => contains(part, cell, place);
      if (term.name === "co") return !isIn(term.args[0]!);
      return term.name === "meet" ? term.args.every(isIn) : term.args.some(isIn);
    }
    case "shift":
      throw new Error("a step in a Boolean algebra");
  }
}

/**
 * For each cell of some elements, that it is empty: `meet(x, y) ≤ z`, for instance.
 * @param top without it, the outer cell is never empty
 */
function cellsOf(elements: readonly ElementTerm[], top: boolean): CarrierAtom[] {
  return subsetsOf(elements).flatMap((inside) => {
    const outside = elements.filter((other) => !inside.includes(other));
    const together = (name: "meet" | "join", some: readonly ElementTerm[]) =>
      some.reduce((all, next) => apply(name, all, next));
    if (inside.length === 0) return top ? [compare(together("join", outside), "=", number(1))] : [];
    const left = together("meet", inside);
    return outside.length === 0
      ? [compare(left, "=", number(0))]
      : [compare(left, "≤", together("join", outside))];
  });
}

/** The subsets, small ones first, each in order. */
function subsetsOf<Member>(members: readonly Member[]): (readonly Member[])[] {
  const subsets = Array.from({ length: 2 ** members.length }, (_, bits) =>
    members.filter((_member, place) => (bits >>> place) & 1),
  );
  return subsets.sort((a, b) => a.length - b.length);
}

function plainComplaint(term: ElementTerm, where: string, example: string): Complaint | null {
  switch (term.kind) {
    case "element":
      return pathComplaint(term, where);
    case "number":
      return complain(`${where} has no number ${term.value}`, `elements alone, as in \`${example}\``);
    case "shift":
      return complain(`${where} has no steps from an element to the next`, `\`${example}\``);
    case "apply":
      return complain(
        `\`${term.name}\` says nothing in ${where}`,
        `${WHERE_DEFINED[term.name]}, where it is defined`,
      );
  }
}

function algebraComplaint(term: ElementTerm): Complaint | null {
  switch (term.kind) {
    case "element":
      return pathComplaint(term, ALGEBRA);
    case "number":
      if (term.value === 0 || term.value === 1) return null;
      return complain(`${ALGEBRA} has the numbers 0 and 1 only, and no ${term.value}`, "`0` or `1`");
    case "shift":
      return complain(`${ALGEBRA} has no steps from an element to the next`, "`join(x, y)`");
    case "apply":
      return (
        operationComplaint(term) ??
        term.args.reduce<Complaint | null>((found, part) => found ?? algebraComplaint(part), null)
      );
  }
}

function operationComplaint({ name, args }: Operation): Complaint | null {
  const operands = OPERANDS[name];
  if (operands === null)
    return complain(`the elements of ${ALGEBRA} have no parents`, "a forest, where elements have parents");
  if (args.length === operands) return null;
  const form = name === "co" ? "co(x)" : `${name}(x, y)`;
  return complain(
    `\`${name}\` takes ${operands === 1 ? "one term" : "two terms"}, and not ${args.length}`,
    `\`${form}\``,
  );
}

/** @param relation the relation that is there; null where elements are compared by order */
function relationComplaint(
  { name, args }: CarrierAtom & { readonly kind: "holds" },
  where: string,
  relation: string | null,
): Complaint | null {
  if (name !== relation) {
    const instead = args.length === 2 ? args : [element("x"), element("y")];
    const written =
      relation === null
        ? writeComparison({
            kind: "compare",
            relation: where === ALGEBRA ? "≤" : "<",
            left: instead[0]!,
            right: instead[1]!,
          })
        : writeTerms(relation, instead);
    return complain(`\`${name}\` says nothing in ${where}`, `\`${written}\``);
  }
  if (args.length === 2) return null;
  return complain(`\`${name}\` is said of two elements, and not of ${args.length}`, `\`${name}(x, y)\``);
}

function hasElement(term: ElementTerm): boolean {
  return term.kind === "element" || (term.kind === "apply" && term.args.some(hasElement));
}

function variableOf(term: ElementTerm): string {
  if (term.kind !== "element") throw new Error("a term that is no element, in a generic structure");
  return term.variable;
}

function ordersOf(x: ElementTerm, y: ElementTerm): CarrierAtom[] {
  return [compare(x, "<", y), compare(y, "<", x), compare(x, "≤", y), compare(y, "≤", x)];
}

function writeTerms(name: string, args: readonly ElementTerm[]): string {
  return `${name}(${args.map(writeTerm).join(", ")})`;
}
