/** Mistakes as the lines of a traceback: the cell's line with its number, and a caret under the place. */
import type { Diagnostic } from "../../lib/language/diagnostics.ts";
import { columnsOf, counted, grouped, visible } from "./text.ts";

/** Mistakes that are shown with their lines; more are only counted. */
const SHOWN = 20;

/** Columns of a cell's line that are shown; a longer line is cut around the place. */
const SHOWN_COLUMNS = 96;

/** Columns that are kept before the place in a line that is cut. */
const KEPT_BEFORE = 40;

/** Tabs go on to the next multiple of this many columns. */
const TAB = 4;

/**
 * The lines of a traceback.
 * @param text the cell that the places count from
 */
export function showTrouble(diagnostics: readonly Diagnostic[], text: string): readonly string[] {
  const characters = Array.from(text);
  const starts = lineStarts(characters);
  const lines: string[] = [];
  for (const diagnostic of diagnostics.slice(0, SHOWN)) {
    if (lines.length > 0) lines.push("");
    lines.push(...troubleLines(diagnostic, characters, starts));
  }
  if (diagnostics.length > SHOWN)
    lines.push("", `and ${counted(diagnostics.length - SHOWN, "more mistake")}`);
  return lines;
}

/** The code points at which lines begin. A line ends with a line feed, a carriage return, or both. */
function lineStarts(characters: readonly string[]): readonly number[] {
  const starts = [0];
  characters.forEach((character, index) => {
    const ends = character === "\n" || (character === "\r" && characters[index + 1] !== "\n");
    if (ends) starts.push(index + 1);
  });
  return starts;
}

function troubleLines(
  { from, to, message, suggestion }: Diagnostic,
  characters: readonly string[],
  starts: readonly number[],
): readonly string[] {
  const at = Math.max(0, Math.min(from, characters.length));
  const row = rowOf(starts, at);
  const start = starts[row]!;
  const lineOf = (index: number) => {
    const end = starts[index + 1] ?? characters.length;
    const content = characters.slice(starts[index]!, end);
    while (content.at(-1) === "\n" || content.at(-1) === "\r") content.pop();
    return content;
  };
  const content = lineOf(row);
  const column = Math.min(at - start, content.length);
  const length = Math.max(1, Math.min(to - at, content.length - column));
  const drawn = drawLine(content, column, length);
  const number = grouped(row + 1);
  const lastRow = rowOf(starts, Math.max(at, Math.min(to, characters.length) - 1));
  const extent = lastRow > row ? ` to line ${grouped(lastRow + 1)}` : "";
  const margin = " ".repeat(number.length);
  const lines = [
    `line ${number}, column ${grouped(column + 1)}${extent}: ${visible(message)}`,
    `  ${number} │ ${drawn.text}`.trimEnd(),
    `  ${margin} │ ${" ".repeat(drawn.before)}${"^".repeat(drawn.under)}`,
  ];
  if (suggestion !== null) lines.push(`  ${margin}   ${visible(suggestion)}`);
  return lines;
}

/** The last line that begins at or before a place. */
function rowOf(starts: readonly number[], place: number): number {
  let [low, high] = [0, starts.length - 1];
  while (low < high) {
    const middle = Math.ceil((low + high) / 2);
    if (starts[middle]! <= place) low = middle;
    else high = middle - 1;
  }
  return low;
}

/** A line as it is shown, and the columns before and under the marked stretch. */
function drawLine(
  content: readonly string[],
  column: number,
  length: number,
): { readonly text: string; readonly before: number; readonly under: number } {
  // A combining mark is drawn with the letter before it: a cut must not part the two.
  const isMark = (index: number) => index > 0 && index < content.length && columnsOf(content[index]!) === 0;
  let first = content.length > SHOWN_COLUMNS && column > KEPT_BEFORE ? column - KEPT_BEFORE : 0;
  while (isMark(first)) first -= 1;
  let text = first > 0 ? "…" : "";
  let width = first > 0 ? 1 : 0;
  let before = 0;
  let after: number | null = null;
  let index = first;
  for (; index < content.length && (width < SHOWN_COLUMNS || isMark(index)); index += 1) {
    if (index === column) before = width;
    if (index === column + length) after = width;
    const character = content[index]!;
    const columns = character === "\t" ? TAB - (width % TAB) : shownColumns(character);
    text += character === "\t" ? " ".repeat(columns) : visible(character);
    width += columns;
  }
  if (index === column) before = width;
  const end = after ?? width;
  if (index < content.length) text += "…";
  return { text, before, under: Math.max(1, end - before) };
}

function shownColumns(character: string): number {
  return visible(character) === character ? columnsOf(character) : 1;
}
