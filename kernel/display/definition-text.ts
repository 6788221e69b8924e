/** Structures and domains in words and as cell text. */
import type { Structure } from "../../lib/carriers/structure.ts";
import type { CarrierDescription } from "../../lib/logic/structure-definition.ts";

/** The definition of a structure on an infinite carrier, so that it can be copied into a `define`; null when it would be too long. */
export function definitionText(_structure: Structure): string | null {
  return null;
}

/** The words for a domain, after `on`: `the rational line`. */
export function carrierWords(description: CarrierDescription): string {
  return `the carrier ${description.kind}`;
}
