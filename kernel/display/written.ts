/** Theories and questions as text for other programs. */
import type { Statement } from "../../lib/language/statements.ts";
import type { EndReason } from "../../lib/logic/meter.ts";
import type { Shown } from "./answers.ts";
import { type Block, code, line } from "./blocks.ts";
import { renderBundle } from "./bundle.ts";
import { counted, visible } from "./text.ts";

type Write = Statement & { readonly kind: "write" };

/** Longer texts are folded on the page. */
const OPEN_LINES = 24;

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

/** A text that was not finished, or cannot be written. */
export function showUnwritten(statement: Write, ended: EndReason | "not-of-numbers"): Shown {
  const subject = subjectOf(statement);
  const reason =
    ended === "not-of-numbers"
      ? "the structure is not made of rational numbers, integers or natural numbers, or it would be too large"
      : ended === "memory"
        ? "it would be too large"
        : ended === "budget"
          ? "it would take too much work"
          : "interrupted";
  const form = statement.format.kind === "dimacs" ? "DIMACS" : "SMT-LIB";
  const summary = `${subject} is not written as ${form}: ${reason}`;
  return {
    summary,
    data: renderBundle([line(summary), line(code(statement.text.replace(/\s+/g, " ")))], "without-latex"),
  };
}

function subjectOf({ subject }: Write): string {
  if (subject.kind === "structure") return `${subject.structure.text} ⊨ ${subject.asked}`;
  const { theory, conclusion } = subject;
  return conclusion === null ? theory.text : `${theory.text} ⊨ ${conclusion.text}`;
}

function summariseWritten(statement: Write, text: string): string {
  const { format } = statement;
  const subject = subjectOf(statement);
  if (statement.subject.kind === "structure") {
    const problems = text.match(/^\(check-sat\)/gm)?.length ?? 0;
    return `${subject} as SMT-LIB: ${counted(problems, "problem")} of arithmetic, unsat where it is true`;
  }
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

/** For `eval --json`. @param text null when it was not finished */
export function writtenData({ format }: Write, text: string | null): Readonly<Record<string, unknown>> {
  return { format: format.kind, size: format.kind === "dimacs" ? format.size : null, text };
}
