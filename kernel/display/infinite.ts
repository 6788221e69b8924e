/** Infinite structures as they are shown. */
import type { Structure } from "../../lib/carriers/structure.ts";
import { type Block, line } from "./blocks.ts";

export function definedBlocks(role: string, _structure: Structure): readonly Block[] {
  return [line(role)];
}
