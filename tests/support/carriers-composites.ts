/** Structures on carriers made of others, for tests: descriptions, definitions in short, what they define. */
import { buildCarrier } from "../../lib/carriers/build.ts";
import { kindExamplesOf } from "../../lib/carriers/kind-examples.ts";
import type { Structure, Table } from "../../lib/carriers/structure.ts";
import { vocabularyOf } from "../../lib/carriers/vocabulary/of.ts";
import { parseFormula } from "../../lib/language/parser.ts";
import { emptyScope } from "../../lib/language/statements.ts";
import { allOf, anyOf, isTrueOf, notOf } from "../../lib/logic/carrier-formulas.ts";
import type { Formula, RelationSymbol } from "../../lib/logic/formula.ts";
import { Meter } from "../../lib/logic/meter.ts";
import type {
  CarrierAtom,
  CarrierDescription,
  CarrierFormula,
  DefinedRelation,
  ElementTerm,
} from "../../lib/logic/structure-definition.ts";
import { satisfies } from "../../lib/structures/evaluate.ts";

export const R: RelationSymbol = { name: "R", places: 2, infix: false };

export const rationals: CarrierDescription = { kind: "dense-line", colours: 1 };
export function integers(offset = 0): CarrierDescription {
  return { kind: "integer-line", offset };
}
export function naturals(offset = 0, ends = 0): CarrierDescription {
  return { kind: "half-line", offset, ends };
}
export function points(size: number): CarrierDescription {
  return { kind: "points", size };
}
export function tuples(over: CarrierDescription, ...widths: readonly number[]): CarrierDescription {
  return { kind: "tuples", over, widths };
}
export function sum(...parts: readonly CarrierDescription[]): CarrierDescription {
  return { kind: "sum", parts };
}
export function product(outer: CarrierDescription, inner: CarrierDescription): CarrierDescription {
  return { kind: "product", outer, inner };
}

/** `x`, `x.1`, `x.outer.2`, …, a number, or one of these and steps: `x.1 + 2`. */
export function term(text: string): ElementTerm {
  const [head, by] = text.split(" + ");
  if (by !== undefined) return { kind: "shift", of: term(head!), by: Number(by) };
  if (/^\d+$/.test(text)) return { kind: "number", value: Number(text) };
  const [variable, ...steps] = text.split(".");
  const path = steps.map((step) => (step === "outer" || step === "inner" ? step : Number(step)));
  return { kind: "element", variable: variable!, path };
}

/** `x.1 < y.1`, `part(x) = 2`. */
export function atom(text: string): CarrierAtom {
  const label = /^(colour|copy|part)\((.*)\) = (\d+)$/.exec(text);
  if (label !== null)
    return {
      kind: "label",
      name: label[1] as "colour" | "copy" | "part",
      of: term(label[2]!),
      value: Number(label[3]),
    };
  const [left, relation, right] = text.split(/ (=|<|≤) /);
  return {
    kind: "compare",
    relation: relation as "=" | "<" | "≤",
    left: term(left!),
    right: term(right!),
  };
}

/** Disjunctions of conjunctions of atoms and their negations: `part(x) = 1 & x < y | ~x.1 = y.1`. */
export function formula(text: string): CarrierFormula {
  const literal = (one: string) => (one.startsWith("~") ? notOf(atom(one.slice(1))) : atom(one));
  return anyOf(text.split(" | ").map((part) => allOf(part.split(" & ").map(literal))));
}

/** The relation of x and y that a formula, as above, defines. */
export function definition(text: string, relation = R): DefinedRelation {
  return { relation, variables: ["x", "y", "z"].slice(0, relation.places), formula: formula(text) };
}

/** The structure in which relations are as defined. */
export function structureOf(
  description: CarrierDescription,
  ...relations: readonly DefinedRelation[]
): Structure {
  const carrier = buildCarrier(description);
  const vocabulary = vocabularyOf(carrier);
  const tables = new Map<string, Table>();
  for (const { relation, variables, formula: defining } of relations) {
    const holds = kindExamplesOf(carrier, relation.places).map((example) =>
      isTrueOf(defining, (one) => {
        const complaint = vocabulary.complaint(one);
        if (complaint !== null) throw new Error(complaint.message);
        return vocabulary.holds(one, example, (variable) => variables.indexOf(variable));
      }),
    );
    tables.set(relation.name, { relation, holds: Uint8Array.from(holds, Number) });
  }
  return { carrier, tables };
}

/** The sentence that a text of the language says. */
export function sentence(text: string, ...relations: readonly RelationSymbol[]): Formula {
  const read = parseFormula(text, { ...emptyScope, declared: relations.length === 0 ? [R] : relations });
  if (!("formula" in read)) throw new Error(read.diagnostics[0]!.message);
  return read.formula;
}

/** Whether a sentence, or the text of one, is true in a structure. */
export function isTrue(structure: Structure, said: Formula | string): boolean {
  return satisfies(structure, typeof said === "string" ? sentence(said) : said, new Meter(1e9, () => false));
}

/** Carriers made of lines and points, in many ways. */
export const composites: readonly CarrierDescription[] = [
  tuples(rationals, 1, 0),
  tuples(rationals, 1, 1),
  tuples(rationals, 2),
  tuples(rationals, 2, 1, 0),
  tuples({ kind: "dense-line", colours: 2 }, 1, 1),
  tuples(naturals(), 1, 1),
  tuples(naturals(), 2),
  tuples(naturals(1, 1), 1, 1, 0),
  tuples(integers(1), 1, 0),
  tuples(integers(), 2, 1),
  tuples(points(2), 2, 0),
  tuples(rationals, 0, 0),
  sum(naturals(), integers()),
  sum(naturals(1, 2), integers(1)),
  sum(rationals, points(1), rationals),
  sum(tuples(rationals, 1, 0), naturals()),
  sum(sum(naturals(), rationals), points(2)),
  product(rationals, integers()),
  product(naturals(), naturals()),
  product(rationals, points(2)),
  product(points(3), naturals(1, 1)),
  product(integers(1), rationals),
  product(sum(naturals(), rationals), points(2)),
  product(tuples(rationals, 1, 0), naturals()),
  product(product(naturals(), rationals), points(2)),
  tuples(product(rationals, integers()), 1, 1),
  tuples(sum(rationals, points(1)), 2),
];

/** Finite ones. */
export const finite: readonly CarrierDescription[] = [
  tuples(points(2), 2),
  tuples(points(3), 1, 0, 1),
  tuples(points(2), 2, 1),
  sum(points(2), points(3)),
  sum(points(1), tuples(points(2), 1, 0)),
  product(points(2), points(3)),
  product(sum(points(1), points(2)), points(2)),
  tuples(product(points(2), points(1)), 1, 1),
];

const tournament: CarrierDescription = { kind: "generic", of: "tournament" };
const tree: CarrierDescription = { kind: "dense-tree" };
function algebra(zero: boolean, top: boolean): CarrierDescription {
  return { kind: "boolean-algebra", zero, top };
}
function forest(rooted: boolean, offset: number, ends: number): CarrierDescription {
  return { kind: "forest", branching: 2, rooted, offset, ends };
}

/** Carriers of all kinds, and made of all kinds. */
export const ofAllKinds: readonly CarrierDescription[] = [
  ...composites,
  points(3),
  rationals,
  { kind: "dense-line", colours: 3 },
  integers(2),
  naturals(2, 2),
  tournament,
  { kind: "generic", of: "partial-order" },
  tree,
  algebra(true, true),
  algebra(false, true),
  algebra(false, false),
  forest(true, 1, 1),
  forest(false, 2, 0),
  tuples(tournament, 1, 1),
  tuples({ kind: "generic", of: "graph" }, 2, 0),
  tuples(tree, 1, 1),
  tuples(algebra(false, false), 1, 1),
  tuples(forest(false, 1, 0), 1, 1),
  sum(tree, naturals()),
  sum(forest(true, 1, 1), integers(1)),
  sum(algebra(true, true), rationals),
  sum(tournament, { kind: "generic", of: "digraph" }),
  product(tree, points(2)),
  product(rationals, forest(false, 1, 0)),
  product(tournament, { kind: "generic", of: "graph" }),
  product(algebra(true, true), points(2)),
  product(points(2), tree),
];

/** A short name of a carrier. */
export function nameOf(description: CarrierDescription): string {
  switch (description.kind) {
    case "points":
      return String(description.size);
    case "dense-line":
      return description.colours === 1 ? "ℚ" : `ℚ in ${description.colours} colours`;
    case "integer-line":
      return description.offset === 0 ? "ℤ" : `ℤ(${description.offset})`;
    case "half-line":
      return description.offset + description.ends === 0
        ? "ω"
        : `ω(${description.offset},${description.ends})`;
    case "tuples":
      return `[${description.widths}] over ${nameOf(description.over)}`;
    case "sum":
      return `(${description.parts.map(nameOf).join(" + ")})`;
    case "product":
      return `(${nameOf(description.outer)} × ${nameOf(description.inner)})`;
    case "generic":
      return description.of;
    case "forest":
      return `forest ${description.branching} ${description.rooted} ${description.offset} ${description.ends}`;
    default:
      return JSON.stringify(Object.values(description));
  }
}
