/**
 * A notebook as the text of a file, spelled as Jupyter's own writer spells it: keys sorted, one space of indentation
 * for each level, text as a list of lines, a newline at the end.
 */
import type { Cell, Notebook, Output } from "./nbformat.ts";

/** Kept in memory by front ends, not to be stored. */
const UNSTORED_METADATA = ["orig_nbformat", "orig_nbformat_minor", "signature"];
/** Types beside `text/…` whose values are stored as lines. */
const TYPES_IN_LINES = new Set(["application/javascript", "image/svg+xml"]);

export function writeNotebook(notebook: Notebook): string {
  const stored = {
    ...notebook,
    metadata: without(notebook.metadata, UNSTORED_METADATA),
    cells: notebook.cells.map(storeCell),
  };
  return `${spell(stored, "\n")}\n`;
}

function storeCell(cell: Cell): object {
  // `trusted` would have the outputs of a file from elsewhere run their scripts.
  const stored = {
    ...cell,
    metadata: without(cell.metadata, ["trusted"]),
    source: inLines(cell.source),
  };
  if (cell.cell_type === "code") return { ...stored, outputs: cell.outputs.map(storeOutput) };
  const { attachments } = cell;
  if (attachments === undefined) return stored;
  return {
    ...stored,
    attachments: mapValues(attachments, bundleInLines),
  };
}

function storeOutput(output: Output): object {
  switch (output.output_type) {
    case "stream":
      return { ...output, text: inLines(output.text) };
    case "display_data":
    case "execute_result":
      return { ...output, data: bundleInLines(output.data) };
    case "error":
      return output;
  }
}

function bundleInLines(bundle: Readonly<Record<string, unknown>>): Record<string, unknown> {
  return mapValues(bundle, (value, type) =>
    typeof value === "string" && (type.startsWith("text/") || TYPES_IN_LINES.has(type))
      ? inLines(value)
      : value,
  );
}

function mapValues<A, B>(
  record: Readonly<Record<string, A>>,
  map: (value: A, key: string) => B,
): Record<string, B> {
  return Object.fromEntries(Object.entries(record).map(([key, value]) => [key, map(value, key)]));
}

function without(
  record: Readonly<Record<string, unknown>>,
  keys: readonly string[],
): Record<string, unknown> {
  return Object.fromEntries(Object.entries(record).filter(([key]) => !keys.includes(key)));
}

/**
 * Code points that end a line besides `\n`, `\r` and `\r\n`: Jupyter's writer cuts at all that Python's
 * `str.splitlines` cuts at (docs.python.org, "Built-in Types").
 */
const LINE_ENDS = new Set([0x0a, 0x0b, 0x0c, 0x0d, 0x1c, 0x1d, 0x1e, 0x85, 0x2028, 0x2029]);

/** The lines of a text, each with its end; none for the empty text. A list is left as it is. */
function inLines(text: string | readonly string[]): readonly string[] {
  if (typeof text !== "string") return text;
  const lines: string[] = [];
  let begin = 0;
  for (let at = 0; at < text.length; at++) {
    if (!LINE_ENDS.has(text.charCodeAt(at))) continue;
    if (text[at] === "\r" && text[at + 1] === "\n") at++;
    lines.push(text.slice(begin, at + 1));
    begin = at + 1;
  }
  if (begin < text.length) lines.push(text.slice(begin));
  return lines;
}

/**
 * JSON with sorted keys. `JSON.stringify` does not do: it puts keys that look like numbers first.
 * @param newline a line end and the indentation of the level
 */
function spell(value: unknown, newline: string): string {
  if (typeof value !== "object" || value === null) return JSON.stringify(value);
  const deeper = `${newline} `;
  const parts = Array.isArray(value)
    ? value.map((part) => spell(part, deeper))
    : Object.entries(value)
        .filter(([, part]) => part !== undefined)
        .sort(([left], [right]) => compareCodePoints(left, right))
        .map(([key, part]) => `${JSON.stringify(key)}: ${spell(part, deeper)}`);
  const [open, close] = Array.isArray(value) ? "[]" : "{}";
  return parts.length === 0
    ? `${open}${close}`
    : `${open}${deeper}${parts.join(`,${deeper}`)}${newline}${close}`;
}

function compareCodePoints(left: string, right: string): number {
  const a = Array.from(left);
  const b = Array.from(right);
  for (let index = 0; index < a.length && index < b.length; index++) {
    const difference = a[index]!.codePointAt(0)! - b[index]!.codePointAt(0)!;
    if (difference !== 0) return difference;
  }
  return a.length - b.length;
}
