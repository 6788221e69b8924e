/** Theories and questions as text for other programs. */
import type { Statement } from "../../lib/language/statements.ts";
import type { Shown } from "./answers.ts";
import { type Block, code, line } from "./blocks.ts";
import { renderBundle } from "./bundle.ts";
import { counted, visible } from "./text.ts";

type Write = Statement & { readonly kind: "write" };

/** Longer texts are folded on the page. */
const OPEN_LINES = 60;

/**
 * `write T as F`. Plain text is the text itself, so that it can be piped on.
 * @param text what was written, ending in a line end
 */
export function showWritten(statement: Write, text: string): Shown {
  const summary = summariseWritten(statement, text);
  const lines = text.split("\n").length - 1;
  const source: Block = { kind: "source", text: text.replace(/\n$/, "") };
  const blocks: Block[] = [
    line(summary),
    line(code(statement.text.replace(/\s+/g, " "))),
    lines <= OPEN_LINES ? source : { kind: "fold", title: counted(lines, "line"), blocks: [source] },
  ];
  return {
    summary,
    data: { ...renderBundle(blocks, "without-latex"), "text/plain": visible(text.replace(/\n$/, "")) },
  };
}

function summariseWritten({ theory, conclusion, format }: Write, text: string): string {
  const subject = conclusion === null ? theory.text : `${theory.text} ⊨ ${conclusion.text}`;
  if (format.kind === "smt-lib") {
    const commands = text.match(/^\((?:assert|declare)/gm)?.length ?? 0;
    const asserts = text.match(/^\(assert/gm)?.length ?? 0;
    return `${subject} as SMT-LIB: ${counted(commands - asserts, "declaration")}, ${counted(asserts, "assertion")}`;
  }
  const header = /^p cnf (\d+) (\d+)/m.exec(text);
  const size = counted(format.size, "point");
  if (header === null) return `${subject} as DIMACS, on ${size}`;
  return `${subject} as DIMACS, on ${size}: ${counted(Number(header[1]), "variable")}, ${counted(Number(header[2]), "clause")}`;
}

/** For `eval --json`. */
export function writtenData({ format }: Write, text: string): Readonly<Record<string, unknown>> {
  return { format: format.kind, size: format.kind === "dimacs" ? format.size : null, text };
}
