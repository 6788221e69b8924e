/** Structures of answers, where a test knows of which kind they are. */
import { type AnyStructure, isOfTerms } from "../../lib/carriers/any-structure.ts";
import type { Structure } from "../../lib/carriers/structure.ts";

/** The structure, which must be there and on a carrier. */
export function onCarrier(structure: AnyStructure | null): Structure {
  if (structure === null || isOfTerms(structure))
    throw new Error("a structure on a carrier is expected here");
  return structure;
}
