/** Structures: a carrier with a table for every relation. */
import type { RelationSymbol } from "../logic/formula.ts";
import type { Carrier } from "./carrier.ts";
import { Points } from "./points.ts";

/** Where a relation holds. */
export interface Table {
  readonly relation: RelationSymbol;
  /** One entry for each kind of tuple of as many elements as the relation has places: 1 where it holds, else 0. */
  readonly holds: Uint8Array;
}

export interface Structure {
  readonly carrier: Carrier;
  /** By the name of the relation. */
  readonly tables: ReadonlyMap<string, Table>;
}

/** The tuples at which a relation holds in a structure on points, counted from 1, in ascending order. */
export function tuplesOf(structure: Structure, relation: string): readonly (readonly number[])[] {
  const table = structure.tables.get(relation);
  if (table === undefined || !(structure.carrier instanceof Points)) return [];
  const { carrier } = structure;
  const tuples: (readonly number[])[] = [];
  table.holds.forEach((value, kind) => {
    if (value === 1) tuples.push(carrier.tupleOf(table.relation.places, kind));
  });
  return tuples;
}
