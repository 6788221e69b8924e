/**
 * Structures as they are shown. What depends on the kind of structure is decided here: points are shown by tables and
 * lists of tuples, structures on infinite carriers by their definition and a sample, free terms by their recursion.
 */
import { type AnyStructure, isOfTerms, sizeOf } from "../../lib/carriers/any-structure.ts";
import { buildCarrier } from "../../lib/carriers/build.ts";
import { buildStructure } from "../../lib/carriers/defined.ts";
import { printStructureDefinition } from "../../lib/language/carrier-printing.ts";
import type { StructureDefinition } from "../../lib/logic/structure-definition.ts";
import type { Block } from "./blocks.ts";
import { carrierWords, definitionText } from "./definition-text.ts";
import { isOnPoints, onPoints, pointsBlocks, pointsData, pointsSource } from "./finite-structures.ts";
import { definedBlocks } from "./infinite.ts";
import { termsBlocks, termsWords } from "./term-structures.ts";
import { counted } from "./text.ts";

/** What a structure lives on, as it is said after `on`: `3 points`, `the rational line`. */
export function domainOf(structure: AnyStructure): string {
  if (isOfTerms(structure)) return termsWords(structure);
  const { size, description } = structure.carrier;
  return size === null ? carrierWords(description) : counted(size, "point");
}

/** As {@link domainOf}, for a structure that has not been built. */
export function domainOfDefinition({ carrier }: StructureDefinition): string {
  const size = carrier.kind === "points" ? carrier.size : buildCarrier(carrier).size;
  return size === null ? carrierWords(carrier) : counted(size, "point");
}

/**
 * The structure as the cell language writes it, so that it can be copied into a `define`; null when it is too long to be
 * of use there, or the language cannot write it.
 */
export function sourceOf(structure: AnyStructure): string | null {
  if (isOfTerms(structure)) return null;
  return isOnPoints(structure) ? pointsSource(structure) : definitionText(structure);
}

/**
 * All that is shown of a structure.
 * @param role what it is an example of, as a noun phrase: `countermodel`
 */
export function structureBlocks(role: string, structure: AnyStructure): readonly Block[] {
  if (isOfTerms(structure)) return termsBlocks(role, structure);
  if (isOnPoints(structure)) return pointsBlocks(role, structure);
  const numbered = onPoints(structure);
  if (numbered === null) return definedBlocks(role, structure);
  return [...definedBlocks(role, structure), ...pointsBlocks("the same on points", numbered)];
}

/** As {@link structureBlocks}, for a structure as the user has defined it. */
export function definitionBlocks(role: string, definition: StructureDefinition): readonly Block[] {
  const structure = buildStructure(definition);
  if (isOnPoints(structure)) return pointsBlocks(role, structure);
  const numbered = onPoints(structure);
  return [
    ...definedBlocks(role, structure, definition),
    ...(numbered === null ? [] : pointsBlocks("the same on points", numbered)),
  ];
}

/**
 * A definition for `eval --json`: the size, null for an infinite structure, and for each relation its tuples of points
 * counted from 1; where these are too many or infinitely many, the definition instead.
 */
export function structureData(definition: StructureDefinition): Readonly<Record<string, unknown>> {
  const structure = buildStructure(definition);
  const numbered = onPoints(structure);
  return {
    size: structure.carrier.size,
    ...(numbered === null
      ? { definition: printStructureDefinition(definition, "ascii") }
      : { relations: pointsData(numbered) }),
  };
}

/** For `eval --json`, beside the size of a structure that was found: what it is, where the size does not say it. */
export function infiniteData(structure: AnyStructure | null): Readonly<Record<string, unknown>> {
  if (structure === null || sizeOf(structure) !== null) return {};
  const definition = isOfTerms(structure) ? null : definitionText(structure, "ascii");
  return { infiniteModel: definition ?? domainOf(structure) };
}
