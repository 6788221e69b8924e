/** Isomorphism of finite structures, by canonical forms. */
import { Points } from "../carriers/points.ts";
import type { Structure, Table } from "../carriers/structure.ts";
import type { Meter } from "../logic/meter.ts";
import { Canoniser } from "./canonical.ts";

/**
 * A text that two structures on points share exactly if they have the same relations, by name and places, and are
 * isomorphic.
 * @param meter pays for the work; when it ends, `WorkEnded` is thrown
 */
export function canonicalForm(structure: Structure, meter: Meter | null = null): string {
  const size = sizeOf(structure);
  const tables = sortedTables(structure);
  const places = tables.map((table) => table.relation.places);
  const shape = tables.map((table) => `${table.relation.name}/${table.relation.places}`);
  const form = new Canoniser(size, places).canonise(
    tables.map((table) => table.holds),
    meter,
  );
  return `${size};${shape.join()};${form}`;
}

/**
 * How many renamings of its points take a structure to itself.
 * @param meter pays for the work; when it ends, `WorkEnded` is thrown
 */
export function automorphismCount(structure: Structure, meter: Meter | null = null): bigint {
  const tables = sortedTables(structure);
  const canoniser = new Canoniser(
    sizeOf(structure),
    tables.map((table) => table.relation.places),
  );
  canoniser.canonise(
    tables.map((table) => table.holds),
    meter,
  );
  return canoniser.automorphismCount;
}

/** Whether a bijection between the points of two structures preserves all relations both ways. */
export function areIsomorphic(left: Structure, right: Structure, meter: Meter | null = null): boolean {
  if (sizeOf(left) !== sizeOf(right)) return false;
  return profile(left) === profile(right) && canonicalForm(left, meter) === canonicalForm(right, meter);
}

/** What is told at a glance: the relations, and how many tuples they hold of. */
function profile(structure: Structure): string {
  return sortedTables(structure)
    .map(
      ({ relation, holds }) =>
        `${relation.name}/${relation.places}:${holds.reduce((sum, bit) => sum + bit, 0)}`,
    )
    .join();
}

/** By name. */
function sortedTables(structure: Structure): readonly Table[] {
  return [...structure.tables.entries()].sort(([a], [b]) => (a < b ? -1 : 1)).map(([, table]) => table);
}

function sizeOf(structure: Structure): number {
  const { carrier } = structure;
  if (!(carrier instanceof Points)) throw new TypeError("canonical forms are of structures on points");
  return carrier.size;
}
