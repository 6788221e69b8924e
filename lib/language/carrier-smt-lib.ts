/**
 * Sentences about a definable structure over the rational, integer or natural numbers as problems of linear arithmetic with
 * quantifiers, in SMT-LIB 2.6: any general solver can confirm what is true there.
 *
 * An element is one of finitely many shapes, each with coordinates that are numbers: on tagged tuples a shape is a copy, on a
 * sum a part, on a product each has the coordinates of both components. So ∀x φ becomes a conjunction over the shapes
 * of x, with ∀ over its coordinates; a relation becomes a defined function for each choice of shapes.
 */
import { buildCarrier } from "../carriers/build.ts";
import { vocabularyOf } from "../carriers/vocabulary/of.ts";
import { mapElements, termsOf } from "../logic/carrier-formulas.ts";
import type { Formula, RelationSymbol, Variable } from "../logic/formula.ts";
import { relationsOf } from "../logic/formula.ts";
import type {
  CarrierAtom,
  CarrierDescription,
  CarrierFormula,
  DefinedRelation,
  ElementTerm,
  StructureDefinition,
} from "../logic/structure-definition.ts";
import { relationSymbol, writeSymbol } from "./smt-lib-symbols.ts";

/** Shapes, and functions for each relation, beyond which nothing is written. */
const MOST_SHAPES = 60;
const MOST_FUNCTIONS = 400;

/** An element of a certain shape, with numbers at its ends. */
type Element =
  | { readonly kind: "number"; readonly name: string; readonly sort: Sort; readonly least: number | null }
  | { readonly kind: "point"; readonly point: number }
  | { readonly kind: "tuple"; readonly copy: number; readonly coordinates: readonly Element[] }
  /** With what the part is a part: the carrier itself, not a sum of others. */
  | {
      readonly kind: "part";
      readonly part: number;
      readonly carrier: CarrierDescription;
      readonly of: Element;
    }
  | { readonly kind: "pair"; readonly outer: Element; readonly inner: Element };
type Sort = "Real" | "Int";

/**
 * A script that asks whether a sentence is false in the structure: `unsat` says that it is true there. Null when the
 * structure is not over lines of numbers, does not define a relation of the sentence, or would make too long a script.
 * @param name what the sentence is called, for a comment
 */
export function printArithmetic(
  structure: StructureDefinition,
  sentence: Formula,
  name: string,
): string | null {
  if (structure.carrier.kind === "points") return null;
  const shapes = shapesOf(structure.carrier);
  if (shapes === null || shapes.length > MOST_SHAPES) return null;
  const definitions = structure.relations as readonly DefinedRelation[];
  const used = relationsOf(sentence).map(({ name: used }) =>
    definitions.find(({ relation }) => relation.name === used),
  );
  if (used.some((definition) => definition === undefined)) return null;
  const functions = used.reduce((sum, definition) => sum + shapes.length ** definition!.variables.length, 0);
  if (functions > MOST_FUNCTIONS) return null;
  const writer = new Writer(shapes);
  const lines = used.flatMap((definition) => writer.define(definition!));
  const negated = `(assert (not ${writer.write(sentence, new Map())}))`;
  const sorts = new Set(shapes.flatMap((make) => numbersOf(make("x")).map(({ sort }) => sort)));
  const logic = sorts.size === 2 ? "LIRA" : sorts.has("Real") ? "LRA" : "LIA";
  return [
    `; unsat: ${name.replaceAll(/\s+/g, " ")} is true in the structure, sat: it is false there`,
    "(set-info :smt-lib-version 2.6)",
    `(set-logic ${logic})`,
    ...lines,
    negated,
    "(check-sat)",
    "",
  ].join("\n");
}

/** Makes an element of a shape, its numbers named after a variable. */
type Shape = (variable: string) => Element;

/** All shapes of elements; null when some are not made of numbers. */
function shapesOf(carrier: CarrierDescription): readonly Shape[] | null {
  switch (carrier.kind) {
    case "points":
      return Array.from({ length: carrier.size }, (_, point) => () => ({ kind: "point", point }));
    case "dense-line":
      return carrier.colours > 1 ? null : [(name) => ({ kind: "number", name, sort: "Real", least: null })];
    case "integer-line":
      return [(name) => ({ kind: "number", name, sort: "Int", least: null })];
    case "half-line":
      return [(name) => ({ kind: "number", name, sort: "Int", least: 0 })];
    case "tuples": {
      const over = shapesOf(carrier.over);
      return (
        over &&
        carrier.widths.flatMap((width, copy) =>
          choices(over, width).map(
            (coordinates): Shape =>
              (name) => ({
                kind: "tuple",
                copy,
                coordinates: coordinates.map((make, place) => make(`${name}.${place + 1}`)),
              }),
          ),
        )
      );
    }
    case "sum": {
      const parts = carrier.parts.map(shapesOf);
      if (parts.includes(null)) return null;
      return parts.flatMap((shapes, place) => {
        const before = carrier.parts.slice(0, place).reduce((count, part) => count + partCount(part), 0);
        return shapes!.map(
          (make): Shape =>
            (name) => {
              const of = make(name);
              // Of a part that is a sum itself, its parts are told apart.
              if (of.kind === "part") return { ...of, part: before + of.part };
              return { kind: "part", part: before, carrier: carrier.parts[place]!, of };
            },
        );
      });
    }
    case "product": {
      const [outers, inners] = [shapesOf(carrier.outer), shapesOf(carrier.inner)];
      if (outers === null || inners === null) return null;
      return outers.flatMap((outer) =>
        inners.map(
          (inner): Shape =>
            (name) => ({
              kind: "pair",
              outer: outer(`${name}.outer`),
              inner: inner(`${name}.inner`),
            }),
        ),
      );
    }
    default:
      return null;
  }
}

function partCount(carrier: CarrierDescription): number {
  return carrier.kind === "sum" ? carrier.parts.reduce((count, part) => count + partCount(part), 0) : 1;
}

/** All lists of that length; cut short once there are too many. */
function choices<Choice>(of: readonly Choice[], length: number): readonly (readonly Choice[])[] {
  let lists: (readonly Choice[])[] = [[]];
  for (let place = 0; place < length; place += 1)
    lists = lists.flatMap((list) => of.map((one) => [...list, one])).slice(0, MOST_FUNCTIONS + 1);
  return lists;
}

type Numbers = Extract<Element, { kind: "number" }>;
type Point = Extract<Element, { kind: "point" }>;

function numbersOf(element: Element): readonly Numbers[] {
  switch (element.kind) {
    case "number":
      return [element];
    case "point":
      return [];
    case "tuple":
      return element.coordinates.flatMap(numbersOf);
    case "part":
      return numbersOf(element.of);
    case "pair":
      return [...numbersOf(element.outer), ...numbersOf(element.inner)];
  }
}

/** Where a variable of a sentence stands: the number of its shape, and an element of that. */
interface Placed {
  readonly shape: number;
  readonly element: Element;
}

class Writer {
  readonly #shapes: readonly Shape[];
  /** Quantifiers so far: each gets names of its own. */
  #names = 0;

  constructor(shapes: readonly Shape[]) {
    this.#shapes = shapes;
  }

  /** A function for each choice of shapes. */
  define({ relation, variables, formula }: DefinedRelation): readonly string[] {
    return choices([...this.#shapes.keys()], variables.length).map((chosen) => {
      const elements = new Map(
        variables.map((variable, place) => [variable, this.#shapes[chosen[place]!]!(variable)]),
      );
      const parameters = [...elements.values()]
        .flatMap(numbersOf)
        .map(({ name, sort }) => `(${writeSymbol(name)} ${sort})`);
      const body = writeCarrierFormula(formula, elements);
      return `(define-fun ${this.#nameOf(relation, chosen)} (${parameters.join(" ")}) Bool ${body})`;
    });
  }

  write(formula: Formula, scope: ReadonlyMap<Variable, Placed>): string {
    const part = (inner: Formula) => this.write(inner, scope);
    switch (formula.kind) {
      case "true":
      case "false":
        return formula.kind;
      case "atom": {
        const args = formula.args.map((arg) => scope.get(arg)!);
        const name = this.#nameOf(
          formula.relation,
          args.map(({ shape }) => shape),
        );
        const numbers = args.flatMap(({ element }) => numbersOf(element)).map((one) => writeSymbol(one.name));
        return numbers.length === 0 ? name : `(${[name, ...numbers].join(" ")})`;
      }
      case "equal":
        return areSame(scope.get(formula.left)!.element, scope.get(formula.right)!.element);
      case "not":
        return `(not ${part(formula.body)})`;
      case "and":
      case "or":
        return `(${formula.kind} ${formula.parts.map(part).join(" ")})`;
      case "implies":
        return `(=> ${part(formula.left)} ${part(formula.right)})`;
      case "iff":
        return `(= ${part(formula.left)} ${part(formula.right)})`;
      case "forall":
      case "exists": {
        const { kind, variable, body } = formula;
        const cases = this.#shapes.map((make, shape) => {
          const element = make(`${variable}_${this.#names++}`);
          const numbers = numbersOf(element);
          const inner = this.write(body, new Map(scope).set(variable, { shape, element }));
          const bounds = numbers.flatMap(({ name, least }) =>
            least === null ? [] : [`(>= ${writeSymbol(name)} ${least})`],
          );
          const bounded =
            bounds.length === 0
              ? inner
              : `(${kind === "forall" ? "=>" : "and"} ${all("and", bounds)} ${inner})`;
          if (numbers.length === 0) return inner;
          const list = numbers.map(({ name, sort }) => `(${writeSymbol(name)} ${sort})`).join(" ");
          return `(${kind} (${list}) ${bounded})`;
        });
        return all(kind === "forall" ? "and" : "or", cases);
      }
    }
  }

  #nameOf(relation: RelationSymbol, shapes: readonly number[]): string {
    if (this.#shapes.length === 1) return relationSymbol(relation.name);
    return writeSymbol(`${relation.name} ${shapes.map((shape) => shape + 1).join(" ")}`);
  }
}

/** A conjunction or disjunction of any number of parts. */
function all(kind: "and" | "or", parts: readonly string[]): string {
  const others = parts.filter((part) => part !== (kind === "and" ? "true" : "false"));
  if (others.length === 0) return kind === "and" ? "true" : "false";
  return others.length === 1 ? others[0]! : `(${kind} ${others.join(" ")})`;
}

function areSame(left: Element, right: Element): string {
  if (left.kind === "number" && right.kind === "number")
    return `(= ${writeSymbol(left.name)} ${writeSymbol(right.name)})`;
  if (left.kind === "point" && right.kind === "point") return left.point === right.point ? "true" : "false";
  if (left.kind === "tuple" && right.kind === "tuple" && left.copy === right.copy)
    return all(
      "and",
      left.coordinates.map((one, place) => areSame(one, right.coordinates[place]!)),
    );
  if (left.kind === "part" && right.kind === "part" && left.part === right.part)
    return areSame(left.of, right.of);
  if (left.kind === "pair" && right.kind === "pair")
    return all("and", [areSame(left.outer, right.outer), areSame(left.inner, right.inner)]);
  return "false";
}

function writeCarrierFormula(formula: CarrierFormula, elements: ReadonlyMap<string, Element>): string {
  const part = (inner: CarrierFormula) => writeCarrierFormula(inner, elements);
  switch (formula.kind) {
    case "true":
    case "false":
      return formula.kind;
    case "not":
      return `(not ${part(formula.body)})`;
    case "and":
    case "or":
      return all(formula.kind, formula.parts.map(part));
    case "implies":
      return `(=> ${part(formula.left)} ${part(formula.right)})`;
    case "iff":
      return `(= ${part(formula.left)} ${part(formula.right)})`;
    default:
      return writeAtom(formula, elements);
  }
}

/** What a term stands for: a number or an element with a shift; and in which copies and parts it is. */
interface Meant {
  readonly element: Element | number;
  readonly shift: number;
  /** Components are compared only within one copy of a product, elements only within one part of a sum. */
  readonly within: readonly Within[];
}
type Within =
  | { readonly outer: Element }
  /** @param depth how many steps of the path lead to the element that is in the part */
  | { readonly part: number; readonly carrier: CarrierDescription; readonly depth: number };

function writeAtom(atom: CarrierAtom, elements: ReadonlyMap<string, Element>): string {
  if (atom.kind === "holds") return "false";
  const terms = termsOf(atom).map((term) =>
    meaningOf(term, elements, atom.kind === "label" && atom.name === "part"),
  );
  const [left, right] = terms;
  if (!left || right === null) return "false";
  for (const meant of [left, ...(right === undefined ? [] : [right])])
    for (const within of meant.within) if ("part" in within && isSilent(atom, within)) return "false";
  if (atom.kind === "label") {
    const { element } = left;
    if (typeof element === "number") return "false";
    const number =
      atom.name === "part" && element.kind === "part"
        ? element.part
        : atom.name === "copy" && element.kind === "tuple"
          ? element.copy
          : atom.name === "copy" && element.kind === "point"
            ? element.point
            : null;
    return number === atom.value - 1 ? "true" : "false";
  }
  const together = haveInCommon(left.within, right!.within);
  if (together === null) return "false";
  const [one, other] = [left.element, right!.element];
  if (isNumeric(one) && isNumeric(other)) {
    const operator = atom.relation === "≤" ? "<=" : atom.relation;
    const compared = `(${operator} ${writeNumber(one, left.shift)} ${writeNumber(other, right!.shift)})`;
    return all("and", [...together, compared]);
  }
  if (atom.relation !== "=" || typeof one === "number" || typeof other === "number") return "false";
  return all("and", [...together, areSame(one, other)]);
}

/** Whether an atom says nothing in a part of a sum, and so is false there. */
function isSilent(atom: CarrierAtom, { carrier, depth }: Extract<Within, { part: number }>): boolean {
  const own = mapElements(atom, (element) => ({ ...element, path: element.path.slice(depth) }));
  // That elements are the same is said of all.
  const isIdentity =
    own.kind === "compare" &&
    own.relation === "=" &&
    [own.left, own.right].every((term) => term.kind === "element" && term.path.length === 0);
  return !isIdentity && vocabularyOf(buildCarrier(carrier)).complaint(own) !== null;
}

function isNumeric(meant: Element | number): meant is Numbers | Point | number {
  return typeof meant === "number" || meant.kind === "number" || meant.kind === "point";
}

/** Points are the numbers from 1 on. */
function writeNumber(number: Numbers | Point | number, shift: number): string {
  if (typeof number === "number") return numeral(number + shift);
  if (number.kind === "point") return numeral(number.point + 1 + shift);
  const name = writeSymbol(number.name);
  return shift === 0 ? name : `(+ ${name} ${numeral(shift)})`;
}

function numeral(value: number): string {
  return value < 0 ? `(- ${-value})` : String(value);
}

/**
 * Null when a component is not there.
 * @param isPart whether the part of a sum is meant, and not the element in it
 */
function meaningOf(term: ElementTerm, elements: ReadonlyMap<string, Element>, isPart = false): Meant | null {
  switch (term.kind) {
    case "number":
      return { element: term.value, shift: 0, within: [] };
    case "shift": {
      const of = meaningOf(term.of, elements);
      return of && { ...of, shift: of.shift + term.by };
    }
    case "apply":
      return null;
    case "element": {
      let element = elements.get(term.variable)!;
      const within: Within[] = [];
      for (const [depth, step] of term.path.entries()) {
        element = withoutParts(element, within, depth);
        if (element.kind === "tuple" && typeof step === "number") {
          const coordinate = element.coordinates[step - 1];
          if (coordinate === undefined) return null;
          element = coordinate;
        } else if (element.kind === "pair" && step === "outer") element = element.outer;
        else if (element.kind === "pair" && step === "inner") {
          within.push({ outer: element.outer });
          element = element.inner;
        } else return null;
      }
      return {
        element: isPart ? element : withoutParts(element, within, term.path.length),
        shift: 0,
        within,
      };
    }
  }
}

function withoutParts(element: Element, within: Within[], depth: number): Element {
  let inner = element;
  for (; inner.kind === "part"; inner = inner.of)
    within.push({ part: inner.part, carrier: inner.carrier, depth });
  return inner;
}

/** That two components are in the same copies and parts, as conditions; null when they are not. */
function haveInCommon(left: readonly Within[], right: readonly Within[]): readonly string[] | null {
  const conditions: string[] = [];
  for (const [place, one] of left.entries()) {
    const other = right[place];
    // A number is in no copy and no part.
    if (other === undefined) continue;
    if ("part" in one && "part" in other) {
      if (one.part !== other.part) return null;
    } else if ("outer" in one && "outer" in other) conditions.push(areSame(one.outer, other.outer));
    else return null;
  }
  return conditions;
}
