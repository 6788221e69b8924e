/**
 * Structures as they are shown. What depends on the kind of structure is decided here: points are shown by tables and
 * lists of tuples, infinite structures by their definition and a sample.
 */
import { buildCarrier } from "../../lib/carriers/build.ts";
import type { Structure } from "../../lib/carriers/structure.ts";
import type { StructureDefinition } from "../../lib/logic/structure-definition.ts";
import type { Block } from "./blocks.ts";
import { carrierWords, definitionText } from "./definition-text.ts";
import { isOnPoints, onPoints, pointsBlocks, pointsData, pointsSource } from "./finite-structures.ts";
import { definedBlocks } from "./infinite.ts";
import { counted } from "./text.ts";

/** What a structure lives on, as it is said after `on`: `3 points`, `the rational line`. */
export function domainOf({ carrier }: Structure): string {
  return carrier.size === null ? carrierWords(carrier.description) : counted(carrier.size, "point");
}

/** As {@link domainOf}, for a structure that has not been built. */
export function domainOfDefinition({ carrier }: StructureDefinition): string {
  const size = carrier.kind === "points" ? carrier.size : buildCarrier(carrier).size;
  return size === null ? carrierWords(carrier) : counted(size, "point");
}

/**
 * The structure as the cell language writes it, so that it can be copied into a `define`; null when it is too long to be
 * of use there.
 */
export function sourceOf(structure: Structure): string | null {
  return isOnPoints(structure) ? pointsSource(structure) : definitionText(structure);
}

/**
 * All that is shown of a structure.
 * @param role what it is an example of, as a noun phrase: `countermodel`
 */
export function structureBlocks(role: string, structure: Structure): readonly Block[] {
  if (isOnPoints(structure)) return pointsBlocks(role, structure);
  const numbered = onPoints(structure);
  if (numbered === null) return definedBlocks(role, structure);
  return [...definedBlocks(role, structure), ...pointsBlocks("the same on points", numbered)];
}

/**
 * For `eval --json`: the size, null for an infinite one, and for each relation its tuples of points counted from 1; for
 * an infinite structure its definition instead.
 */
export function structureData(structure: Structure): Readonly<Record<string, unknown>> {
  const { size } = structure.carrier;
  const numbered = onPoints(structure);
  return numbered === null
    ? { size, definition: definitionText(structure) }
    : { size, relations: pointsData(numbered) };
}
