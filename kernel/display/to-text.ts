/** Blocks as plain text, complete by itself: what a terminal shows, and what remains when nothing richer is read. */
import { printFormula, printTerm } from "../../lib/language/printer.ts";
import type { Block, Inline, TableBlock } from "./blocks.ts";
import { displayWidth, padEnd, padStart, visible, widestOf, wrap } from "./text.ts";

/** Columns that a line of prose or a formula may take before it is broken. */
const WIDTH = 100;

export function blocksToText(blocks: readonly Block[]): string {
  return blocks.map(blockToText).filter(Boolean).join("\n");
}

export function inlineToText(parts: readonly Inline[]): string {
  return parts.map(pieceToText).join("");
}

function pieceToText(piece: Inline): string {
  if (typeof piece === "string") return visible(piece);
  switch (piece.kind) {
    case "formula":
      return printFormula(piece.formula, "unicode");
    case "term":
      return printTerm(piece.term, "unicode");
    case "relation":
      return visible(piece.name);
    case "cell":
    case "code":
    case "math":
    case "strong":
      return visible(piece.text);
    case "verdict":
      return piece.leads ? `${piece.word}: ` : piece.word;
  }
}

function blockToText(block: Block): string {
  switch (block.kind) {
    case "line":
      return lineToText(block.parts);
    case "paragraph":
      return `\n${wrap(unbroken(block.parts), WIDTH).join("\n").replaceAll(HELD, " ")}`;
    case "note":
      return wrap(`(${inlineToText(block.parts)})`, WIDTH).join("\n");
    case "source":
      return visible(block.text);
    case "table":
      return tableToText(block);
    case "picture":
    case "gallery":
      return "";
    case "beside":
      return blocksToText(block.blocks);
    case "group":
      return `\n${blocksToText(block.blocks)}`;
    case "fold":
      return `\n${visible(block.title)}\n${blocksToText(block.blocks)}`;
  }
}

/** Prose is wrapped; what the user wrote, or may copy, keeps its line. */
function lineToText(parts: readonly Inline[]): string {
  const text = inlineToText(parts);
  const isCopied = parts.some(
    (piece) => typeof piece !== "string" && (piece.kind === "code" || piece.kind === "cell"),
  );
  return isCopied ? text : wrap(text, WIDTH).join("\n");
}

/** Columns that a cell of prose before the last one may take, and a sentence of a derivation. */
const CELL_WIDTH = 38;
const SENTENCE_WIDTH = 54;

/** For each column of a table of prose, whether it stands before the last one and has cells of several lines. */
export function longColumns({ look, head, rows }: TableBlock): readonly boolean[] {
  return head.map(
    (_, column) =>
      (look === "prose" || look === "kinds") &&
      column < head.length - 1 &&
      rows.some((row) => displayWidth(inlineToText(row[column] ?? [])) > CELL_WIDTH),
  );
}

/** Stands for a space at which no line may end. */
const HELD = "\u00a0";
/** Columns that a formula in the middle of prose may take for it to stay in one piece. */
const UNBROKEN_WIDTH = 24;

/** The text of a cell with its short formulas in one piece. */
function unbroken(cell: readonly Inline[]): string {
  return cell
    .map((piece) => {
      const text = pieceToText(piece);
      const isShort = typeof piece !== "string" && displayWidth(text) <= UNBROKEN_WIDTH;
      return isShort ? text.replaceAll(" ", HELD) : text;
    })
    .join("");
}

/** Columns set under each other, a rule under the head; long cells of prose go on below themselves. */
function tableToText(table: TableBlock): string {
  const isWrapped = table.look === "prose" || table.look === "derivation" || table.look === "kinds";
  const cellWidth = table.look === "derivation" ? SENTENCE_WIDTH : CELL_WIDTH;
  const head = table.head.map(visible);
  const last = head.length - 1;
  const rows = table.rows.map((row) =>
    row.map((cell, column): readonly string[] => {
      const text = column === last ? unbroken(cell) : inlineToText(cell);
      return isWrapped && column < last ? wrap(text, cellWidth) : [text];
    }),
  );
  const widths = head.map((title, column) => widestOf([title, ...rows.flatMap((row) => row[column] ?? [])]));
  const gap = table.look === "matrix" ? " " : "  ";
  const before = widths.slice(0, last).reduce((sum, width) => sum + width + gap.length, 0);
  const lastWidth = Math.max(24, WIDTH - before);
  const set = (cells: readonly string[]) =>
    cells
      .map((cell, column) => {
        if (table.look === "numbers") return padStart(cell, widths[column]!);
        return column === last ? cell : padEnd(cell, widths[column]!);
      })
      .join(gap)
      .trimEnd();
  const lines: string[] = [];
  for (const row of rows) {
    const cells = row.map((cell, column) =>
      isWrapped && column === last
        ? wrap(cell[0]!, lastWidth).map((text, at) => (at === 0 ? text : `  ${text}`).replaceAll(HELD, " "))
        : cell,
    );
    const height = Math.max(...cells.map((cell) => cell.length));
    for (let at = 0; at < height; at += 1) lines.push(set(cells.map((cell) => cell[at] ?? "")));
  }
  const headLine = set(head);
  lines.unshift(headLine, "─".repeat(widestOf([headLine, ...lines])));
  const body = lines.join("\n");
  return table.caption === null ? body : `${visible(table.caption)}\n${body}`;
}
