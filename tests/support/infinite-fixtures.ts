/** Infinite structures for tests, from cell text. */
import { buildStructure } from "../../lib/carriers/defined.ts";
import type { Structure } from "../../lib/carriers/structure.ts";
import { parseCell } from "../../lib/language/parser.ts";
import { emptyScope, type NamedStructure, type Scope } from "../../lib/language/statements.ts";

/** What a definition means, or an error with the first mistake. */
export function readDefinition(text: string, scope: Scope = emptyScope): NamedStructure {
  const { statements, diagnostics } = parseCell(`define A := ${text}`, scope);
  const [statement] = statements;
  if (statement?.kind !== "define" || statement.definition.kind !== "structure")
    throw new Error(`${text}: ${diagnostics[0]?.message}`);
  return { text: "A", structure: statement.definition.structure };
}

export function definedStructure(text: string, scope: Scope = emptyScope): Structure {
  return buildStructure(readDefinition(text, scope).structure);
}
