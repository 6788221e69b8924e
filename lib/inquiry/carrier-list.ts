/** The infinite carriers that a search goes through, and in which order. */
import type { CarrierDescription } from "../logic/structure-definition.ts";

const rationals = line(1);
const integers = integerLine(0);
const naturals = halfLine(0, 0);
const point: CarrierDescription = { kind: "points", size: 1 };

/**
 * The simplest structures first: fewest kinds and components, smallest offsets, quickly listed before slowly. Of two that
 * have the same structures up to the names of kinds, one is listed.
 */
export const CARRIERS: readonly CarrierDescription[] = [
  // Lines.
  rationals,
  naturals,
  integers,
  halfLine(1, 0),
  integerLine(1),
  // Lines with a point at an end or beside them, and with a first element told apart.
  tuples(rationals, 1, 0),
  halfLine(0, 1),
  halfLine(1, 1),
  line(2),
  tuples(naturals, 1, 0),
  { kind: "dense-tree" },
  generic("tournament"),
  generic("graph"),
  generic("partial-order"),
  algebra(false, false),
  algebra(false, true),
  // Copies.
  tuples(rationals, 1, 1),
  product(rationals, { kind: "points", size: 2 }),
  product(naturals, { kind: "points", size: 2 }),
  tuples(naturals, 1, 1),
  tuples(integers, 1, 1),
  tuples(halfLine(1, 0), 1, 1),
  tuples(integerLine(1), 1, 1),
  tuples(rationals, 1, 0, 0),
  halfLine(2, 2),
  integerLine(2),
  // Two lines, and points between lines.
  sum(naturals, naturals),
  sum(naturals, integers),
  sum(rationals, rationals),
  sum(rationals, naturals),
  sum(rationals, point, rationals),
  sum(halfLine(1, 0), halfLine(1, 0)),
  sum(halfLine(1, 1), integerLine(1)),
  // Lines of lines.
  product(rationals, integers),
  product(naturals, naturals),
  product(integers, naturals),
  product(integers, integers),
  product(naturals, integers),
  product(rationals, naturals),
  product(naturals, rationals),
  product(integers, rationals),
  product(rationals, integerLine(1)),
  // Trees with next elements.
  forest(2, true, 1, 0),
  forest(2, false, 1, 0),
  forest(2, true, 1, 1),
  forest(3, true, 1, 1),
  generic("digraph"),
  algebra(true, true),
  line(3),
  tuples(rationals, 1, 1, 1),
  product(rationals, { kind: "points", size: 3 }),
  tuples(rationals, 2),
  tuples(rationals, 1, 2),
  halfLine(3, 3),
  integerLine(3),
  tuples(halfLine(1, 1), 1, 1),
  tuples(naturals, 2),
];

function line(colours: number): CarrierDescription {
  return { kind: "dense-line", colours };
}
function integerLine(offset: number): CarrierDescription {
  return { kind: "integer-line", offset };
}
function halfLine(offset: number, ends: number): CarrierDescription {
  return { kind: "half-line", offset, ends };
}
function tuples(over: CarrierDescription, ...widths: readonly number[]): CarrierDescription {
  return { kind: "tuples", over, widths };
}
function sum(...parts: readonly CarrierDescription[]): CarrierDescription {
  return { kind: "sum", parts };
}
function product(outer: CarrierDescription, inner: CarrierDescription): CarrierDescription {
  return { kind: "product", outer, inner };
}
function generic(of: "graph" | "digraph" | "tournament" | "partial-order"): CarrierDescription {
  return { kind: "generic", of };
}
function algebra(zero: boolean, top: boolean): CarrierDescription {
  return { kind: "boolean-algebra", zero, top };
}
function forest(branching: number, rooted: boolean, offset: number, ends: number): CarrierDescription {
  return { kind: "forest", branching, rooted, offset, ends };
}
