/**
 * Structures as records, as evidence has them.
 *
 * A structure is `{carrier, tables}`; `tables` gives for each relation its number of places and the kinds of tuples
 * at which it holds, in ascending order. On the carrier `{"kind": "points", "size": n}` the kind of a tuple of
 * points p₁ … p_k, counted from 1, is the number (p₁ − 1)·n^(k−1) + … + (p_k − 1).
 */
import type { CarrierDescription } from "../logic/structure-definition.ts";
import type { Structure } from "./structure.ts";

export interface TableRecord {
  readonly places: number;
  readonly holds: readonly number[];
}
export interface StructureRecord {
  readonly carrier: CarrierDescription;
  /** By the name of the relation, names in ascending order. */
  readonly tables: Readonly<Record<string, TableRecord>>;
}

/** The record of a structure. */
export function recordStructure(structure: Structure): StructureRecord {
  const tables: Record<string, TableRecord> = {};
  for (const name of [...structure.tables.keys()].sort()) {
    const { relation, holds } = structure.tables.get(name)!;
    const kinds: number[] = [];
    holds.forEach((value, kind) => {
      if (value === 1) kinds.push(kind);
    });
    tables[name] = { places: relation.places, holds: kinds };
  }
  return { carrier: structure.carrier.description, tables };
}
