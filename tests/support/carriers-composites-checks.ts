/** What tests of tuples, sums and products share: random elements and definitions, the game, orders that are known. */
import fc from "fast-check";
import { expect } from "vitest";
import { buildCarrier } from "../../lib/carriers/build.ts";
import type { Carrier } from "../../lib/carriers/carrier.ts";
import { vocabularyOf } from "../../lib/carriers/vocabulary/of.ts";
import { allOf, anyOf, notOf } from "../../lib/logic/carrier-formulas.ts";
import {
  and,
  atom,
  depthOf,
  equal,
  exists,
  type Formula,
  forall,
  implies,
  not,
  or,
  type Variable,
} from "../../lib/logic/formula.ts";
import type {
  CarrierDescription,
  CarrierFormula,
  ElementTerm,
} from "../../lib/logic/structure-definition.ts";
import { isTrue as isTrueByLoops } from "./brute-force.ts";
import {
  formula,
  integers,
  isTrue,
  naturals,
  points,
  product,
  R,
  rationals,
  structureOf,
  sum,
  tuples,
} from "./carriers-composites.ts";
import type { Types } from "./carriers-lines.ts";
import { sentences } from "./random-formulas.ts";
import { configurationOf, elementsWith, isFormulaTrue, type TrueElement, windowOf } from "./true-elements.ts";

/** How often, and with which seed. */
export interface Options {
  readonly seed: number;
  readonly numRuns: number;
  readonly verbose: 1;
}

export function allPlaces(length: number): readonly number[] {
  return Array.from({ length }, (_, place) => place);
}

/** True elements, with gaps of all sizes between them on discrete lines, and room between them on dense ones. */
export function trueElement(description: CarrierDescription): fc.Arbitrary<TrueElement> {
  const number = fc.oneof(fc.integer({ min: -3, max: 3 }), fc.integer({ min: -25, max: 25 }));
  switch (description.kind) {
    case "points":
      return fc.integer({ min: 1, max: description.size });
    case "half-line":
      return number.map(Math.abs);
    case "integer-line":
      return number;
    case "dense-line":
      return fc
        .tuple(number, fc.nat(description.colours - 1))
        .map(([value, colour]) => value * 1024 * description.colours + colour);
    case "tuples": {
      const over = trueElement(description.over);
      return fc
        .nat(description.widths.length - 1)
        .chain((tag) =>
          fc
            .tuple(...Array.from({ length: description.widths[tag]! }, () => over))
            .map((coordinates) => ({ tag, coordinates })),
        );
    }
    case "sum":
      return fc
        .nat(description.parts.length - 1)
        .chain((part) =>
          trueElement(description.parts[part]!).map((element): TrueElement => ({ part, element })),
        );
    case "product":
      return fc
        .tuple(trueElement(description.outer), trueElement(description.inner))
        .map(([outer, inner]): TrueElement => ({ outer, inner }));
    default:
      throw new Error(`no true elements of ${description.kind}`);
  }
}

export function trueTuples(
  description: CarrierDescription,
  maxLength: number,
  minLength = 1,
): fc.Arbitrary<readonly TrueElement[]> {
  return fc.array(trueElement(description), { minLength, maxLength });
}

/** Formulas about x and y. */
export function definitionsOn(description: CarrierDescription): fc.Arbitrary<CarrierFormula> {
  const atoms = vocabularyOf(buildCarrier(description)).atoms(["x", "y"]);
  const literal = fc
    .tuple(fc.constantFrom(...atoms), fc.boolean())
    .map(([one, plain]): CarrierFormula => (plain ? one : notOf(one)));
  return fc
    .array(fc.array(literal, { minLength: 1, maxLength: 3 }), { minLength: 1, maxLength: 3 })
    .map((parts) => anyOf(parts.map(allOf)));
}

/** Sentences about R, at most so many quantifiers deep. */
export function sentencesTo(depth: number): fc.Arbitrary<Formula> {
  return fc.oneof(
    { weight: 1, arbitrary: sentences([R], depth).filter((said) => depthOf(said) <= depth) },
    { weight: 3, arbitrary: guarded(depth, []) },
  );
}

/**
 * Formulas in which every quantifier speaks of elements on some side of others, as in what is usually said of orders;
 * among formulas of any form such ones are rare.
 */
function guarded(depth: number, scope: readonly Variable[]): fc.Arbitrary<Formula> {
  const variable = ["x", "y", "z", "w"][scope.length]!;
  const inner = [...scope, variable];
  const [newest, ...older] = scope.toReversed();
  const literal = fc
    .tuple(fc.constantFrom(...(older.length > 0 ? older : [newest ?? "x"])), fc.nat(5))
    .map(([other, sort]) => {
      const one =
        sort < 2 ? equal(newest!, other) : sort < 4 ? atom(R, newest!, other) : atom(R, other, newest!);
      return sort % 2 === 0 ? one : not(one);
    });
  if (depth === 0) return literal;
  // On which side of each of the elements in scope, or on any.
  const sides = fc.tuple(...scope.map(() => fc.nat(2))).map((chosen) =>
    scope.flatMap((other, place) => {
      if (chosen[place] === 0) return [];
      return [chosen[place] === 1 ? atom(R, variable, other) : atom(R, other, variable)];
    }),
  );
  const parts = fc.array(
    fc.oneof(
      { weight: scope.length === 0 ? 0 : 1, arbitrary: literal },
      { weight: 4, arbitrary: guarded(depth - 1, inner) },
    ),
    { minLength: 1, maxLength: 2 },
  );
  return fc
    .tuple(fc.boolean(), sides, parts, fc.boolean(), fc.boolean())
    .map(([all, guards, bodies, either, negated]) => {
      const body = either ? or(...bodies) : and(...bodies);
      const quantified = all
        ? forall(variable, guards.length === 0 ? body : implies(and(...guards), body))
        : exists(variable, and(...guards, body));
      return negated ? not(quantified) : quantified;
    });
}

/**
 * The game of Ehrenfeucht and Fraïssé between true elements and what a carrier lists: whatever is chosen on one side is
 * answered on the other by what need not be told apart, and in the end both have the same kinds and the same repeats.
 */
export function play(
  carrier: Carrier,
  description: CarrierDescription,
  moves: number,
  choose: fc.GeneratorValue,
): void {
  const elements: TrueElement[] = [];
  let configuration = carrier.empty;
  for (let toCome = moves - 1; toCome >= 0; toCome -= 1) {
    const extensions = carrier.extensions(configuration, toCome);
    const keyOf = (element: TrueElement) =>
      carrier.key(configurationOf(description, [...elements, element]), toCome);
    if (choose(fc.boolean)) {
      const element = choose(trueElement, description);
      const key = keyOf(element);
      const answer = extensions.find((one) => carrier.key(one, toCome) === key);
      expect(answer, `${JSON.stringify([...elements, element])} with ${toCome} to come`).toBeDefined();
      configuration = answer;
      elements.push(element);
    } else {
      configuration = extensions[choose(fc.nat, { max: extensions.length - 1 })];
      const key = carrier.key(configuration, toCome);
      const answer = windowOf(description, elements, toCome).find((element) => keyOf(element) === key);
      expect(answer, `${JSON.stringify(configuration)} with ${toCome} to come`).toBeDefined();
      elements.push(answer!);
    }
  }
  const truly = configurationOf(description, elements);
  for (const first of elements.keys())
    for (const second of elements.keys()) {
      expect(carrier.kindOf(configuration, [first, second])).toBe(carrier.kindOf(truly, [first, second]));
      expect(carrier.same(configuration, first, second)).toBe(
        JSON.stringify(elements[first]) === JSON.stringify(elements[second]),
      );
    }
  const places = allPlaces(elements.length);
  expect(carrier.kindOf(configuration, places)).toBe(carrier.kindOf(truly, places));
}

/** Random games on a carrier. */
export function checkGames(description: CarrierDescription, moves: number, options: Options): void {
  const carrier = buildCarrier(description);
  fc.assert(
    fc.property(fc.gen(), (choose) => play(carrier, description, moves, choose)),
    options,
  );
}

/**
 * What formulas of a depth say of true elements: of depth 0 their kind, of depth r + 1 the types of depth r of all tuples with
 * one element more (Ehrenfeucht 1961, Fraïssé 1954). Kinds are checked elsewhere.
 */
export function typeOfTrue(
  carrier: Carrier,
  description: CarrierDescription,
  elements: readonly TrueElement[],
  depth: number,
  types: Types,
): number {
  if (depth === 0) {
    const configuration = configurationOf(description, elements);
    return types.of(`kind ${carrier.kindOf(configuration, allPlaces(elements.length))}`);
  }
  return types.ofAll(
    windowOf(description, elements, depth - 1).map((element) =>
      typeOfTrue(carrier, description, [...elements, element], depth - 1, types),
    ),
  );
}

/** The same of what a carrier lists, a configuration of so many elements. */
export function typeOfListed(
  carrier: Carrier,
  configuration: unknown,
  length: number,
  depth: number,
  types: Types,
): number {
  if (depth === 0) return types.of(`kind ${carrier.kindOf(configuration, allPlaces(length))}`);
  return types.ofAll(
    carrier
      .extensions(configuration, depth - 1)
      .map((extended) => typeOfListed(carrier, extended, length + 1, depth - 1, types)),
  );
}

/** Random sentences about random definitions on a finite carrier, against loops over its elements. */
export function checkByLoops(description: CarrierDescription, options: Options): void {
  const elements = elementsWith(description, []);
  fc.assert(
    fc.property(definitionsOn(description), sentencesTo(3), (defined, said) => {
      const holds = new Set<string>();
      for (const [i, x] of elements.entries())
        for (const [j, y] of elements.entries())
          if (isFormulaTrue(defined, description, (variable) => (variable === "x" ? x : y)))
            holds.add(`${i},${j}`);
      const structure = structureOf(description, { relation: R, variables: ["x", "y"], formula: defined });
      expect(isTrue(structure, said)).toBe(isTrueByLoops(said, elements.length, new Map([["R", holds]])));
    }),
    options,
  );
}

/** Random sentences about two orders that none tells apart. */
export function checkEquivalent(
  left: CarrierDescription,
  right: CarrierDescription,
  depth: number,
  options: Options,
): void {
  const [first, second] = [left, right].map((description) =>
    structureOf(description, { relation: R, variables: ["x", "y"], formula: lexicographic(description) }),
  );
  fc.assert(
    fc.property(sentencesTo(depth), (said) => {
      expect(isTrue(first!, said)).toBe(isTrue(second!, said));
    }),
    options,
  );
}

/** Which of the elements x and y comes first: copies, parts and components in their order. */
export function lexicographic(description: CarrierDescription): CarrierFormula {
  return comesFirst(description, []);
}

function comesFirst(
  description: CarrierDescription,
  path: readonly (number | "outer" | "inner")[],
): CarrierFormula {
  const at = (variable: string, ...more: typeof path): ElementTerm => ({
    kind: "element",
    variable,
    path: [...path, ...more],
  });
  const isIn = (variable: string, name: "copy" | "part", value: number): CarrierFormula => ({
    kind: "label",
    name,
    of: at(variable),
    value,
  });
  switch (description.kind) {
    case "points":
    case "dense-line":
    case "integer-line":
    case "half-line":
      return { kind: "compare", relation: "<", left: at("x"), right: at("y") };
    case "tuples": {
      const { widths, over } = description;
      if (widths.length > 1)
        return inTurn("copy", widths.length, isIn, (copy) => comesFirstOfTuples(over, widths[copy]!, path));
      return comesFirstOfTuples(over, widths[0]!, path);
    }
    case "sum":
      return inTurn("part", description.parts.length, isIn, (part) =>
        comesFirst(description.parts[part]!, path),
      );
    case "product":
      return anyOf([
        comesFirst(description.outer, [...path, "outer"]),
        allOf([
          { kind: "compare", relation: "=", left: at("x", "outer"), right: at("y", "outer") },
          comesFirst(description.inner, [...path, "inner"]),
        ]),
      ]);
    default:
      throw new Error(`no order on ${description.kind}`);
  }
}

function comesFirstOfTuples(
  over: CarrierDescription,
  width: number,
  path: readonly (number | "outer" | "inner")[],
): CarrierFormula {
  const coordinates = Array.from({ length: width }, (_, index) => index + 1);
  const equal = (coordinate: number): CarrierFormula => ({
    kind: "compare",
    relation: "=",
    left: { kind: "element", variable: "x", path: [...path, coordinate] },
    right: { kind: "element", variable: "y", path: [...path, coordinate] },
  });
  return anyOf(
    coordinates.map((coordinate) =>
      allOf([...coordinates.slice(0, coordinate - 1).map(equal), comesFirst(over, [...path, coordinate])]),
    ),
  );
}

function inTurn(
  name: "copy" | "part",
  count: number,
  isIn: (variable: string, name: "copy" | "part", value: number) => CarrierFormula,
  within: (number: number) => CarrierFormula,
): CarrierFormula {
  const numbers = Array.from({ length: count }, (_, index) => index + 1);
  return anyOf(
    numbers.flatMap((first) => [
      allOf([isIn("x", name, first), isIn("y", name, first), within(first - 1)]),
      ...numbers
        .filter((second) => first < second)
        .map((second) => allOf([isIn("x", name, first), isIn("y", name, second)])),
    ]),
  );
}

/** Sentences about a linear order R. */
export const saying = {
  "has a least element": "∃x ∀y ¬Ryx",
  "has a greatest element": "∃x ∀y ¬Rxy",
  "is dense": "∀x ∀y (Rxy → ∃z (Rxz ∧ Rzy))",
  "has a next element after each but the last": "∀x ((∃y Rxy) → ∃y (Rxy ∧ ¬∃z (Rxz ∧ Rzy)))",
  "has a next element before each but the first": "∀x ((∃y Ryx) → ∃y (Ryx ∧ ¬∃z (Ryz ∧ Rzx)))",
  "has a limit from below": "∃x ((∃y Ryx) ∧ ∀y (Ryx → ∃z (Ryz ∧ Rzx)))",
  "is a linear order": "∀x ∀y ∀z (¬Rxx ∧ (Rxy ∧ Ryz → Rxz) ∧ (Rxy ∨ x = y ∨ Ryx))",
} as const;

interface KnownOrder {
  readonly name: string;
  readonly description: CarrierDescription;
  readonly order: CarrierFormula;
  /** Whether each of the sentences above but the last is true, in their order. */
  readonly facts: readonly boolean[];
}

/** Facts about orders that are common practice, worked out by hand (Rosenstein, Linear Orderings, 1982, is about such). */
export const facts: readonly KnownOrder[] = [
  known("ω", sum(points(1), naturals()), [true, false, false, true, true, false]),
  {
    name: "ω + ω*",
    description: sum(naturals(), naturals()),
    order: formula(
      "part(x) = 1 & part(y) = 2 | part(x) = 1 & part(y) = 1 & x < y | part(x) = 2 & part(y) = 2 & y < x",
    ),
    facts: [true, true, false, true, true, false],
  },
  known("ω + 1", tuples(naturals(), 1, 0), [true, true, false, true, false, true]),
  known("ω + 1", sum(naturals(), points(1)), [true, true, false, true, false, true]),
  known("ω + ω", product(points(2), naturals()), [true, false, false, true, false, true]),
  known("ω²", product(naturals(), naturals()), [true, false, false, true, false, true]),
  known("copies of ℤ at each rational", product(rationals, integers()), [
    false,
    false,
    false,
    true,
    true,
    false,
  ]),
  known("copies of ℚ at each integer", product(integers(), rationals), [
    false,
    false,
    true,
    false,
    false,
    true,
  ]),
  known("1 + ℚ", sum(points(1), rationals), [true, false, true, false, false, true]),
  known("ω + ζ", sum(naturals(), integers()), [true, false, false, true, true, false]),
  known("pairs at each rational", product(rationals, points(2)), [false, false, false, false, false, true]),
  known("ω + ℚ", sum(naturals(), rationals), [true, false, false, false, false, true]),
];

function known(name: string, description: CarrierDescription, values: readonly boolean[]): KnownOrder {
  return { name, description, order: lexicographic(description), facts: values };
}

/**
 * Orders that no sentence tells apart. Isomorphic are those that are ordinals of the same length or copies of the
 * rationals (Cantor 1895). That ω is like ω + ζ, and ζ like copies of ζ along any order, is common practice (Rosenstein,
 * Linear Orderings, 1982): discrete orders with the same ends are alike as soon as they are infinite.
 */
export const equivalents: readonly (readonly [CarrierDescription, CarrierDescription])[] = [
  [naturals(), sum(naturals(), integers())],
  [naturals(), sum(points(1), naturals())],
  [naturals(), product(naturals(), points(2))],
  [naturals(), sum(naturals(), product(rationals, integers()))],
  [sum(naturals(), naturals()), product(points(2), naturals())],
  [tuples(naturals(), 1, 0), sum(naturals(), points(1))],
  [integers(), sum(integers(), integers())],
  [integers(), product(rationals, integers())],
  [rationals, sum(rationals, rationals)],
  [rationals, sum(rationals, points(1), rationals)],
  [rationals, product(integers(), rationals)],
  [rationals, product(rationals, rationals)],
  [rationals, tuples(rationals, 2)],
  [sum(points(1), rationals), tuples(rationals, 0, 1)],
  [product(naturals(), naturals()), sum(naturals(), product(naturals(), naturals()))],
];
