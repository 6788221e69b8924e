/**
 * From structures that have been found to definitions: for each relation a short formula, in the words of the carrier,
 * that is true at exactly the kinds of its table.
 */
import { allOf, atomsOf, elementsOf, isTrueOf, notOf } from "../logic/carrier-formulas.ts";
import type {
  CarrierAtom,
  CarrierDescription,
  DefinedRelation,
  ElementTerm,
  PointsDescription,
  StructureDefinition,
} from "../logic/structure-definition.ts";
import { writtenDefinition } from "./defined.ts";
import { fitCarrier } from "./fit.ts";
import { kindExamplesOf } from "./kind-examples.ts";
import { shortestFormula } from "./short-formulas.ts";
import { type Structure, type Table, tuplesOf } from "./structure.ts";
import { vocabularyOf } from "./vocabulary/of.ts";

/** Truth values of atoms at kinds that are worked out for one relation; with more there is no definition. */
const MOST_VALUES = 400_000;

/**
 * Defines a structure: one that was built from a definition by that, and others by their tables, with tuples on points,
 * formulas on other carriers, relations by name. The bounds of the carrier are those that the formulas need, so that the
 * definition is what its cell text reads as.
 * @returns null when a relation would take too long to define, or its definition be too long to read
 */
export function definitionOf(structure: Structure): StructureDefinition | null {
  const written = writtenDefinition(structure);
  if (written !== undefined) return written;
  const tables = [...structure.tables.keys()].sort().map((name) => structure.tables.get(name)!);
  const { description } = structure.carrier;
  if (description.kind === "points")
    return {
      carrier: description,
      relations: tables.map(({ relation }) => ({ relation, tuples: tuplesOf(structure, relation.name) })),
    };
  const relations: DefinedRelation[] = [];
  for (const table of tables) {
    const defined = defineRelation(structure, table);
    if (defined === null) return null;
    relations.push(defined);
  }
  const atoms = relations.flatMap(({ formula }) => atomsOf(formula));
  type Other = Exclude<CarrierDescription, PointsDescription>;
  return { carrier: fitCarrier(description, atoms) as Other, relations };
}

/**
 * A short formula that is true at exactly the kinds of a table; which one depends on the table and the carrier alone.
 * @returns null when that would take too long, or the formula be too long to read
 */
export function defineRelation({ carrier }: Structure, { relation, holds }: Table): DefinedRelation | null {
  const variables = variablesFor(relation.places);
  const vocabulary = vocabularyOf(carrier);
  const atoms = vocabulary.atoms(variables);
  if (atoms.length * holds.length > MOST_VALUES) return null;
  const said = withOrEqual(atoms).filter((atom) => vocabulary.complaint(atom) === null);
  const examples = kindExamplesOf(carrier, relation.places);
  const places = new Map(variables.map((variable, place) => [variable, place]));
  const placeOf = (variable: string) => places.get(variable)!;
  const literals = said.flatMap((atom) => {
    const values = bitsOf(examples, (example) => vocabulary.holds(atom, example, placeOf));
    const guards = guardsOf(atom);
    const formula = allOf([...guards, atom]);
    const cost = [...guards, atom].reduce((sum, one) => sum + costOf(one), 0);
    const denial = isPartial(carrier.description, atom) ? 12 : isEquation(atom) ? 1 : 3;
    const all = (1n << BigInt(examples.length)) - 1n;
    return [
      { formula, values, cost },
      { formula: notOf(formula), values: all ^ values, cost: cost + denial },
    ];
  });
  const table = bitsOf([...holds], (value) => value === 1);
  const formula = shortestFormula(literals, table, examples.length);
  if (formula === null) return null;
  examples.forEach((example, kind) => {
    const isTrue = isTrueOf(formula, (atom) => vocabulary.holds(atom, example, placeOf));
    if (isTrue !== (holds[kind] === 1)) throw new Error(`a wrong definition of ${relation.name}`);
  });
  return { relation, variables, formula };
}

function variablesFor(places: number): readonly string[] {
  if (places <= 3) return ["x", "y", "z"].slice(0, places);
  return Array.from({ length: places }, (_, index) => `x${index + 1}`);
}

/** The atoms, and x ≤ y where there is x < y, which says its negation or a disjunction more shortly. */
function withOrEqual(atoms: readonly CarrierAtom[]): readonly CarrierAtom[] {
  const seen = new Set(atoms.map((atom) => JSON.stringify(atom)));
  return atoms.flatMap((atom) => {
    if (atom.kind !== "compare" || atom.relation !== "<") return [atom];
    const weaker: CarrierAtom = { ...atom, relation: "≤" };
    return seen.has(JSON.stringify(weaker)) ? [atom] : [atom, weaker];
  });
}

/** Bit i is set where the i-th member is so. */
function bitsOf<Member>(members: readonly Member[], is: (member: Member) => boolean): bigint {
  let text = "0x";
  for (let high = Math.ceil(members.length / 4) * 4 - 4; high >= 0; high -= 4) {
    let digit = 0;
    for (let bit = 3; bit >= 0; bit -= 1) {
      const at = high + bit;
      digit = digit * 2 + (at < members.length && is(members[at]!) ? 1 : 0);
    }
    text += digit.toString(16);
  }
  return text === "0x" ? 0n : BigInt(text);
}

function isEquation(atom: CarrierAtom): boolean {
  return atom.kind === "label" || (atom.kind === "compare" && atom.relation === "=");
}

/**
 * Whether an atom is false of some elements because it says nothing of them: of elements of different parts or copies, or
 * without a component that others have. Its denial is then easily misread.
 */
function isPartial(description: CarrierDescription, atom: CarrierAtom): boolean {
  if (atom.kind === "label") return false;
  const elements = elementsOf(atom);
  const steps = elements.flatMap(({ path }) => path.slice(0, 1));
  if (steps.length === 0) return description.kind === "sum" && !isEquation(atom);
  if (description.kind === "tuples") {
    const least = Math.min(...description.widths);
    return steps.some((step) => Number(step) > least);
  }
  return steps.includes("inner") && new Set(elements.map(({ variable }) => variable)).size > 1;
}

/**
 * That the elements of an atom are in the same copy, where it compares places in copies: it is false of elements of
 * different ones, which is better said.
 */
function guardsOf(atom: CarrierAtom): readonly CarrierAtom[] {
  const elements = elementsOf(atom);
  const guards = new Map<string, CarrierAtom>();
  const depth = Math.max(0, ...elements.map(({ path }) => path.length));
  for (let at = 0; at < depth; at += 1) {
    const copies = elements
      .filter(({ path }) => path[at] === "inner")
      .map(({ variable, path }): ElementTerm => {
        return { kind: "element", variable, path: [...path.slice(0, at), "outer"] };
      })
      .sort((a, b) => (JSON.stringify(a) < JSON.stringify(b) ? -1 : 1));
    for (const [index, right] of copies.entries()) {
      const left = copies[index - 1];
      if (left === undefined || JSON.stringify(left) === JSON.stringify(right)) continue;
      const guard: CarrierAtom = { kind: "compare", relation: "=", left, right };
      guards.set(JSON.stringify(guard), guard);
    }
  }
  return [...guards.values()];
}

/** How long an atom is to read. */
function costOf(atom: CarrierAtom): number {
  switch (atom.kind) {
    case "compare":
      return 8 + sizeOf(atom.left) + sizeOf(atom.right) + (atom.relation === "≤" ? 1 : 0);
    case "label":
      return 10 + sizeOf(atom.of);
    case "holds":
      return 8 + atom.args.reduce((sum, term) => sum + sizeOf(term), 0);
  }
}

function sizeOf(term: ElementTerm): number {
  switch (term.kind) {
    case "element":
      return 1 + term.path.length;
    case "number":
      return 1 + Math.abs(term.value);
    case "shift":
      return 2 + Math.abs(term.by) + sizeOf(term.of);
    case "apply":
      return 2 + term.args.reduce((sum, part) => sum + sizeOf(part), 0);
  }
}
