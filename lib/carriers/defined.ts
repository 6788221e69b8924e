/** From definitions to structures. */
import { isTrueOf } from "../logic/carrier-formulas.ts";
import type {
  DefinedRelation,
  ListedRelation,
  PointsDescription,
  StructureDefinition,
} from "../logic/structure-definition.ts";
import { buildCarrier } from "./build.ts";
import type { Carrier } from "./carrier.ts";
import { kindExamplesOf } from "./kind-examples.ts";
import { Points } from "./points.ts";
import type { Structure, Table } from "./structure.ts";
import { vocabularyOf } from "./vocabulary/of.ts";

const built = new WeakMap<StructureDefinition, Structure>();
const written = new WeakMap<Structure, StructureDefinition>();

/**
 * Builds a structure from what the user wrote, once for each definition. Points, lengths of tuples, atoms and sizes of tables have been checked where
 * it was read.
 */
export function buildStructure(definition: StructureDefinition): Structure {
  const known = built.get(definition);
  if (known !== undefined) return known;
  const carrier = buildCarrier(definition.carrier);
  const tables = new Map<string, Table>();
  for (const defined of definition.relations) {
    const holds = "tuples" in defined ? listedTable(carrier, defined) : definedTable(carrier, defined);
    tables.set(defined.relation.name, { relation: defined.relation, holds });
  }
  const structure = { carrier, tables };
  built.set(definition, structure);
  written.set(structure, definition);
  return structure;
}

/** The definition that a structure was built from; undefined for one that was found. */
export function writtenDefinition(structure: Structure): StructureDefinition | undefined {
  return written.get(structure);
}

function listedTable(carrier: Carrier, { relation, tuples }: ListedRelation): Uint8Array {
  if (!(carrier instanceof Points)) throw new TypeError("tuples are listed on points alone");
  const holds = new Uint8Array(carrier.kindCount(relation.places));
  for (const tuple of tuples) holds[carrier.kindOfTuple(tuple)] = 1;
  return holds;
}

/** For each kind of tuples, 1 where the formula is true of them. */
export function definedTable(
  carrier: Carrier,
  { relation, variables, formula }: DefinedRelation,
): Uint8Array {
  const vocabulary = vocabularyOf(carrier);
  const places = new Map(variables.map((variable, place) => [variable, place]));
  const placeOf = (variable: string) => places.get(variable)!;
  return Uint8Array.from(kindExamplesOf(carrier, relation.places), (example) =>
    isTrueOf(formula, (atom) => vocabulary.holds(atom, example, placeOf)) ? 1 : 0,
  );
}

/** The tuples of points of which a formula is true, as a list. */
export function listTuples(points: PointsDescription, defined: DefinedRelation): ListedRelation {
  const carrier = new Points(points.size);
  const { relation } = defined;
  const tuples: (readonly number[])[] = [];
  definedTable(carrier, defined).forEach((value, kind) => {
    if (value === 1) tuples.push(carrier.tupleOf(relation.places, kind));
  });
  return { relation, tuples };
}
