/**
 * Named properties of two-place relations: looked up by name, applied to whatever relates two elements. The tables
 * are in `property-axioms.ts` (properties by a sentence of their own) and `property-classes.ts` (conjunctions).
 */
import {
  and,
  atom,
  type Formula,
  type RelationSymbol,
  type Variable,
  variablesOf,
  visit,
} from "./formula.ts";
import { propertyAxioms } from "./property-axioms.ts";
import { propertyClasses } from "./property-classes.ts";
import { type RelationTerm, termFormula } from "./terms.ts";

/** The formula that says that a relation relates `x` to `y`; it has no other free variables. */
export type Relate = (x: Variable, y: Variable) => Formula;

/** A property of two-place relations that has a name in the trade. */
export interface NamedProperty {
  /** In lower case, words joined by hyphens. No name or synonym occurs twice in the table. */
  readonly name: string;
  /** Other names for the same. */
  readonly synonyms: readonly string[];
  /** One sentence. */
  readonly meaning: string;
  /**
   * Author and year. That these publications have the property under that name is from memory, unless a test says
   * otherwise.
   */
  readonly source: string;
  /** The properties whose conjunction it is; empty where it has a sentence of its own. */
  readonly parts: readonly string[];
  /** The sentence that says it of a relation. */
  formulaOf(relate: Relate): Formula;
}

export const namedProperties: readonly NamedProperty[] = [
  ...propertyAxioms.map((entry): NamedProperty => ({ ...entry, parts: [] })),
  ...propertyClasses.map(
    (entry): NamedProperty => ({
      ...entry,
      formulaOf: (relate) => and(...entry.parts.map((part) => findProperty(part)!.formulaOf(relate))),
    }),
  ),
];

const byName = new Map(
  namedProperties.flatMap((property) =>
    [property.name, ...property.synonyms].map((name) => [name, property] as const),
  ),
);

/** The property with a name or synonym; undefined when there is none. */
export function findProperty(name: string): NamedProperty | undefined {
  return byName.get(name);
}

/** All names and synonyms, sorted. */
export const propertyNames: readonly string[] = [...byName.keys()].sort();

/** The sentence that says a property of a relation of two places. */
export function propertyOf(property: NamedProperty, relation: RelationSymbol): Formula {
  return property.formulaOf((x, y) => atom(relation, x, y));
}

const some: RelationSymbol = { name: "R", places: 2, infix: false };

/** The sentence that says a property of what a term relates. */
export function propertyFormula(property: NamedProperty, term: RelationTerm): Formula {
  if (term.kind === "relation") return propertyOf(property, term.relation);
  const own = new Set(variablesOf(propertyOf(property, some)));
  return property.formulaOf((x, y) => termFormula(term, x, y, own));
}

/** How often at most the sentence of a property speaks of its relation. */
export function propertyUses(property: NamedProperty): number {
  let uses = 0;
  visit(propertyOf(property, some), (part) => {
    if (part.kind === "atom") uses += 1;
  });
  return uses;
}
