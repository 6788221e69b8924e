/** Structures on carriers in words and as cell text. */
import { definitionOf } from "../../lib/carriers/definition.ts";
import type { Structure } from "../../lib/carriers/structure.ts";
import { printStructureDefinition } from "../../lib/language/carrier-printing.ts";
import { describeCarrier } from "../../lib/language/carrier-words.ts";
import type { Notation } from "../../lib/language/printer.ts";
import type { CarrierDescription, StructureDefinition } from "../../lib/logic/structure-definition.ts";

const known = new WeakMap<Structure, StructureDefinition | null>();

/** The definition of a structure; null when its relations would take too long to define. */
export function definitionFor(structure: Structure): StructureDefinition | null {
  let definition = known.get(structure);
  if (definition === undefined) {
    definition = definitionOf(structure);
    known.set(structure, definition);
  }
  return definition;
}

/** The definition as cell text, so that it can be copied into a `define`; null when there is none. */
export function definitionText(structure: Structure, notation: Notation = "unicode"): string | null {
  const definition = definitionFor(structure);
  return definition === null ? null : printStructureDefinition(definition, notation);
}

/** The words for a domain, after `on`: `the rational line`. */
export function carrierWords(description: CarrierDescription): string {
  return describeCarrier(description);
}
