/** Pieces of a line as Markdown: formulas between dollar signs, everything else as text that Markdown leaves alone. */
import { printFormula, printTerm } from "../../lib/language/printer.ts";
import type { Inline } from "./blocks.ts";
import { visible } from "./text.ts";
import { relationAsMathematics } from "./to-latex.ts";

export function inlineToMarkdown(parts: readonly Inline[]): string {
  return parts.map(pieceToMarkdown).join("");
}

function pieceToMarkdown(piece: Inline): string {
  if (typeof piece === "string") return escapeMarkdown(piece);
  switch (piece.kind) {
    case "formula":
      return `$${printFormula(piece.formula, "latex")}$`;
    case "term":
      return `$${printTerm(piece.term, "latex")}$`;
    case "relation":
      return relationAsMathematics(piece.name) ?? escapeMarkdown(piece.name);
    case "math":
      return `$${piece.latex}$`;
    case "strong":
      return `**${escapeMarkdown(piece.text)}**`;
    case "cell":
    case "code":
      return codeSpan(visible(piece.text));
    case "verdict":
      return piece.leads ? `${piece.word}: ` : piece.word;
  }
}

/** Prose as Markdown: nothing in it is a sign of Markdown, HTML or mathematics. */
export function escapeMarkdown(text: string): string {
  return visible(text).replace(/[\\`*_{}[\]()<>#+!|$~&]/g, "\\$&");
}

/** Between more backticks than stand together anywhere inside. */
function codeSpan(text: string): string {
  const longest = Math.max(0, ...(text.match(/`+/g) ?? []).map((run) => run.length));
  const fence = "`".repeat(longest + 1);
  const space = longest > 0 ? " " : "";
  return `${fence}${space}${text}${space}${fence}`;
}
