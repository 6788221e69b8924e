/** Whether a cell can be run as it stands, or goes on in the next line. */
import { readTokens } from "./lexer.ts";
import { continuesLine } from "./reader.ts";

export type CellCompleteness =
  | { readonly status: "complete" | "invalid" }
  | { readonly status: "incomplete"; readonly indent: string };

/**
 * A cell is incomplete while a bracket is open or its last line ends in an operator; invalid when a bracket closes
 * that was not opened. Other mistakes depend on the names in scope and are left to the parser.
 */
export function isComplete(text: string): CellCompleteness {
  const tokens = readTokens(text);
  const open: string[] = [];
  for (const { kind } of tokens) {
    if (kind === "open" || kind === "open-brace") open.push(kind);
    else if (kind === "close" && open.pop() !== "open") return { status: "invalid" };
    else if (kind === "close-brace" && open.pop() !== "open-brace") return { status: "invalid" };
  }
  const last = tokens.at(-2);
  const goesOn = last !== undefined && continuesLine(last);
  if (open.length === 0 && !goesOn) return { status: "complete" };
  return { status: "incomplete", indent: "  ".repeat(Math.max(1, Math.min(open.length, 8))) };
}
