/** Structures as the user writes them down: plain data, before a carrier is built. */
import type { RelationSymbol } from "./formula.ts";

/** Points that a finite domain may have. */
export const LARGEST_DOMAIN = 1_000_000;

/**
 * Entries that all tables of one structure may have together: the number of points to the power of the number of
 * places, summed over the relations.
 */
export const LARGEST_TABLES = 250_000;

/** A domain, named. What can be said about its elements is in `lib/carriers`, one file for each kind. */
export interface PointsDescription {
  readonly kind: "points";
  /** How many points; at least 1. They are called 1, 2, …, size. */
  readonly size: number;
}
export type CarrierDescription = PointsDescription;

/** The tuples of points at which a relation holds. */
export interface RelationDefinition {
  readonly relation: RelationSymbol;
  /** Points numbered from 1; each tuple as long as the relation has places. */
  readonly tuples: readonly (readonly number[])[];
}

/** A carrier and the relations that are defined on it; other relations are undefined there. */
export interface StructureDefinition {
  readonly carrier: CarrierDescription;
  readonly relations: readonly RelationDefinition[];
}
