/**
 * What definitions may say of the elements of lines: `x < y`, `x = y`, `x ≤ y`; with steps on the integer line and the
 * half line (`y = x + 1`, `x + 2 ≤ y`); with numbers on the half line (`x = 0`, `x < 3`); and colours on a coloured line.
 *
 * Steps are counted in the integers on the half line too: with x at 0, `x - 1` is −1, which is less than every element
 * and equal to none.
 */
import type { CarrierAtom, ElementTerm } from "../../logic/structure-definition.ts";
import type { DenseConfiguration, DenseLine } from "../dense-line.ts";
import type { HalfLine, HalfLineConfiguration } from "../half-line.ts";
import type { IntegerConfiguration, IntegerLine } from "../integer-line.ts";
import {
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

/** An element and steps from it, or a number alone. */
interface Sum {
  readonly element: Element | null;
  readonly plus: number;
}

/** The vocabulary of the rational line. */
export function denseLineVocabulary(carrier: DenseLine): Vocabulary<DenseConfiguration> {
  const { colours } = carrier.description;
  return {
    complaint(atom) {
      if (atom.kind === "compare") return firstComplaint(atom, onDenseLine);
      if (atom.kind !== "label" || atom.name !== "colour") return wrongAtom(atom, "the rational line");
      if (colours === 1)
        return complain("this rational line has one colour only", "a line with two colours or more");
      return onDenseLine(atom.of) ?? colourComplaint(atom.value, colours);
    },
    holds(atom, { ranks, colours }, place) {
      if (atom.kind === "label") return colours[place(elementOf(atom.of).variable)] === atom.value - 1;
      return isTrue(asComparison(atom), ({ element }) => ranks[place(element!.variable)]!);
    },
    atoms(variables) {
      const labels = colours === 1 ? [] : upTo(1, colours);
      return [
        ...pairsOf(variables).flatMap(([x, y]) => orders(x, y)),
        ...variables.flatMap((x) =>
          labels.map((value): CarrierAtom => ({ kind: "label", name: "colour", of: element(x), value })),
        ),
      ];
    },
  };
}

/** The vocabulary of the integer line. */
export function integerLineVocabulary(carrier: IntegerLine): Vocabulary<IntegerConfiguration> {
  const { offset } = carrier.description;
  return {
    complaint(atom) {
      if (atom.kind !== "compare") return wrongAtom(atom, "the integer line");
      const wrong = firstComplaint(atom, onIntegerLine);
      if (wrong !== null) return wrong;
      if (numberIn(atom.left) || numberIn(atom.right))
        return complain(
          `the integer line looks the same from every element, so \`${writeComparison(atom)}\` says nothing there`,
          "two elements and the steps between them, as in `y = x + 1`, or the half line, which begins with 0",
        );
      return offsetComplaint(atom, offset);
    },
    holds: holdsOfPositions,
    atoms: (variables) => pairsOf(variables).flatMap(([x, y]) => [...orders(x, y), ...steps(x, y, offset)]),
  };
}

/** The vocabulary of the half line. */
export function halfLineVocabulary(carrier: HalfLine): Vocabulary<HalfLineConfiguration> {
  const { offset, ends } = carrier.description;
  return {
    complaint(atom) {
      if (atom.kind !== "compare") return wrongAtom(atom, "the half line");
      const wrong = firstComplaint(atom, onHalfLine);
      if (wrong !== null) return wrong;
      if (sumOf(atom.left).element === null && sumOf(atom.right).element === null)
        return complain(
          `\`${writeComparison(atom)}\` says nothing of an element`,
          "an element and a number, as in `x < 3`",
        );
      const needed = needsOf(atom).ends;
      if (needed > ends)
        return unsettled(
          `this half line tells its first ${ends} numbers apart, and \`${writeComparison(atom)}\` needs the first ${needed}`,
        );
      return offsetComplaint(atom, offset);
    },
    holds: holdsOfPositions,
    atoms: (variables) => [
      ...pairsOf(variables).flatMap(([x, y]) => [...orders(x, y), ...steps(x, y, offset)]),
      ...variables.flatMap((x) =>
        upTo(0, ends - 1).flatMap((value) => {
          const end = number(value);
          // That x is greater than 0 is said by x = 0 already.
          const greater = value === 0 ? [] : [compare(end, "<", element(x))];
          return [compare(element(x), "=", end), ...greater];
        }),
      ),
    ],
  };
}

/**
 * The least offset with which each of the atoms is decided by kinds; 0 when none needs any. Elements of components are
 * taken as they stand, so that definitions on carriers made of lines can be asked about too.
 */
export function neededOffset(atoms: readonly CarrierAtom[]): number {
  return atoms.reduce((most, atom) => Math.max(most, needsOf(atom).offset), 0);
}

/** The least number of places at the end of a half line with which each of the atoms is decided by kinds. */
export function neededEnds(atoms: readonly CarrierAtom[]): number {
  return atoms.reduce((most, atom) => Math.max(most, needsOf(atom).ends), 0);
}

/**
 * A kind gives the difference of two elements cut at ±(offset + 1), so that k − 1 and k are told apart when
 * −(offset + 1) ≤ k − 1 and k ≤ offset + 1; and the position cut at ends, so that k − 1 and k are told apart when k ≤ 0 (there
 * is no k − 1) or k ≤ ends. An inequality tells two neighbours apart; an equation two such pairs.
 */
function needsOf(atom: CarrierAtom): { readonly offset: number; readonly ends: number } {
  const nothing = { offset: 0, ends: 0 };
  if (atom.kind !== "compare" || !isSum(atom.left) || !isSum(atom.right)) return nothing;
  const [left, right] = [sumOf(atom.left), sumOf(atom.right)];
  // The atom is: (the element on the right, or 0) − (the element on the left, or 0) is, or is at least, `bound`.
  const bound = left.plus - right.plus + (atom.relation === "<" ? 1 : 0);
  const boundaries = atom.relation === "=" ? [bound, bound + 1] : [bound];
  const most = (needed: (k: number) => number) => Math.max(0, ...boundaries.map(needed));
  if (left.element !== null && right.element !== null)
    return isSameElement(left.element, right.element)
      ? nothing
      : { offset: most((k) => Math.max(k - 1, -k)), ends: 0 };
  if (right.element !== null) return { offset: 0, ends: most((k) => k) };
  // −x ≥ k is x < 1 − k.
  if (left.element !== null) return { offset: 0, ends: most((k) => 1 - k) };
  return nothing;
}

function holdsOfPositions(
  atom: CarrierAtom,
  { positions }: { readonly positions: readonly number[] },
  place: (variable: string) => number,
): boolean {
  return isTrue(
    asComparison(atom),
    ({ element, plus }) => plus + (element === null ? 0 : positions[place(element.variable)]!),
  );
}

function isTrue({ relation, left, right }: Comparison, valueIn: (sum: Sum) => number): boolean {
  const [first, second] = [valueIn(sumOf(left)), valueIn(sumOf(right))];
  return relation === "=" ? first === second : relation === "<" ? first < second : first <= second;
}

function isSum(term: ElementTerm): boolean {
  return term.kind === "shift" ? isSum(term.of) : term.kind !== "apply";
}

function sumOf(term: ElementTerm): Sum {
  switch (term.kind) {
    case "element":
      return { element: term, plus: 0 };
    case "number":
      return { element: null, plus: term.value };
    case "shift": {
      const { element, plus } = sumOf(term.of);
      return { element, plus: plus + term.by };
    }
    case "apply":
      throw new Error(`${term.name} on a line`);
  }
}

function elementOf(term: ElementTerm): Element {
  if (term.kind !== "element") throw new Error("a label of something that is no element");
  return term;
}

function isSameElement(first: Element, second: Element): boolean {
  return first.variable === second.variable && first.path.join() === second.path.join();
}

function numberIn(term: ElementTerm): boolean {
  return term.kind === "number" || (term.kind === "shift" && numberIn(term.of));
}

function onDenseLine(term: ElementTerm): Complaint | null {
  switch (term.kind) {
    case "element":
      return pathComplaint(term, "the rational line");
    case "number":
      return complain(
        `the rational line looks the same from every element, so the number ${term.value} says nothing there`,
        "a comparison of two elements, as in `x < y`",
      );
    case "shift":
      return complain(
        `the rational line has no next elements, so \`${writeTerm(term)}\` says nothing there`,
        "a comparison without steps, as in `x < y`, or the integer line",
      );
    case "apply":
      return operationComplaint(term, "the rational line");
  }
}

function onIntegerLine(term: ElementTerm): Complaint | null {
  if (term.kind === "element") return pathComplaint(term, "the integer line");
  if (term.kind === "apply") return operationComplaint(term, "the integer line");
  return term.kind === "shift" ? onIntegerLine(term.of) : null;
}

function onHalfLine(term: ElementTerm): Complaint | null {
  if (term.kind === "element") return pathComplaint(term, "the half line");
  if (term.kind === "apply") return operationComplaint(term, "the half line");
  if (term.kind === "shift") return onHalfLine(term.of);
  if (term.value >= 0) return null;
  return complain(`the half line begins with 0, so it has no ${term.value}`, "a number from 0 on");
}

function operationComplaint({ name }: Operation, line: string): Complaint {
  const where =
    name === "parent" ? "a forest" : name === "meet" ? "a tree or a Boolean algebra" : "a Boolean algebra";
  return complain(`\`${name}\` says nothing on ${line}`, `${where}, where it is defined`);
}

function wrongAtom(atom: Exclude<CarrierAtom, Comparison>, line: string): Complaint {
  if (atom.kind === "holds")
    return complain(`\`${atom.name}\` says nothing on ${line}`, "a comparison, as in `x < y`");
  return labelComplaint(atom.name, line, "a comparison, as in `x < y`");
}

function colourComplaint(value: number, colours: number): Complaint | null {
  if (Number.isInteger(value) && value >= 1 && value <= colours) return null;
  return complain(`this rational line has the colours 1 to ${colours}, and no ${value}`, null);
}

function offsetComplaint(atom: Comparison, offset: number): Complaint | null {
  const needed = needsOf(atom).offset;
  if (needed <= offset) return null;
  return unsettled(
    `this line tells differences up to ${offset} apart, and \`${writeComparison(atom)}\` needs those up to ${needed}`,
  );
}

function orders(x: string, y: string): CarrierAtom[] {
  const [left, right] = [element(x), element(y)];
  return [compare(left, "<", right), compare(right, "<", left), compare(left, "=", right)];
}

/** `y = x + k` and `x + (k + 1) ≤ y` for k from 1 to the offset, and the same the other way round. */
function steps(x: string, y: string, offset: number): CarrierAtom[] {
  const shifted = (variable: string, by: number): ElementTerm => ({
    kind: "shift",
    of: element(variable),
    by,
  });
  return upTo(1, offset).flatMap((k) => [
    compare(element(y), "=", shifted(x, k)),
    compare(element(x), "=", shifted(y, k)),
    compare(shifted(x, k + 1), "≤", element(y)),
    compare(shifted(y, k + 1), "≤", element(x)),
  ]);
}

function upTo(first: number, last: number): number[] {
  return Array.from({ length: Math.max(0, last - first + 1) }, (_, index) => first + index);
}
