/**
 * Blocks as LaTeX for a draft: what amsmath, amssymb, booktabs and longtable can set. Pictures are left out; what
 * they show stands in the tables.
 */
import { printFormula, printTerm } from "../../lib/language/printer.ts";
import { relationSigns } from "../../lib/language/tokens.ts";
import type { Block, Inline, TableBlock } from "./blocks.ts";
import { visible, widestOf } from "./text.ts";
import { inlineToText, longColumns } from "./to-text.ts";

/** Rows above which a table may break across pages. */
const LONG_TABLE = 24;

/** Signs of prose that fonts for text often lack, as mathematics. */
export const SIGNS: ReadonlyMap<string, string> = new Map([
  ...relationSigns.flatMap(({ symbol, latex }): [string, string][] =>
    latex[0] === undefined ? [] : [[symbol, latex[0]]],
  ),
  ...[..."⁰¹²³⁴⁵⁶⁷⁸⁹"].map((sign, digit): [string, string] => [sign, `{}^{${digit}}`]),
  ...Object.entries({
    "∀": "\\forall",
    "∃": "\\exists",
    "¬": "\\neg",
    "∧": "\\land",
    "∨": "\\lor",
    "→": "\\to",
    "↔": "\\leftrightarrow",
    "⊨": "\\models",
    "⊭": "\\nvDash",
    "≠": "\\neq",
    "⊤": "\\top",
    "⊥": "\\bot",
    "≤": "\\leq",
    "≥": "\\geq",
    "≺": "\\prec",
    "≼": "\\preceq",
    "≻": "\\succ",
    "≽": "\\succeq",
    "⊏": "\\sqsubset",
    "⊑": "\\sqsubseteq",
    "⊆": "\\subseteq",
    "⊂": "\\subset",
    "⊲": "\\vartriangleleft",
    "⊴": "\\trianglelefteq",
    "∈": "\\in",
    "∘": "\\circ",
    "∁": "\\complement",
    "∪": "\\cup",
    "∩": "\\cap",
    "∼": "\\sim",
    "≈": "\\approx",
    "≡": "\\equiv",
    "⁻": "{}^{-}",
    "−": "-",
    "…": "\\ldots",
    "<": "<",
    ">": ">",
    "|": "|",
  }),
]);

const SPECIAL: ReadonlyMap<string, string> = new Map([
  ["\\", "\\textbackslash{}"],
  ["{", "\\{"],
  ["}", "\\}"],
  ["$", "\\$"],
  ["&", "\\&"],
  ["#", "\\#"],
  ["%", "\\%"],
  ["_", "\\_"],
  ["^", "\\textasciicircum{}"],
  ["~", "\\textasciitilde{}"],
]);

/** Prose as LaTeX: nothing in it is a command. */
export function escapeLatex(text: string): string {
  let escaped = "";
  for (const character of visible(text)) {
    const sign = SIGNS.get(character);
    escaped += sign !== undefined ? `\\ensuremath{${sign}}` : (SPECIAL.get(character) ?? character);
  }
  return escaped;
}

export function blocksToLatex(blocks: readonly Block[]): string {
  return blocks.map(blockToLatex).filter(Boolean).join("\n\n");
}

export function inlineToLatex(parts: readonly Inline[]): string {
  return parts.map(pieceToLatex).join("");
}

function pieceToLatex(piece: Inline): string {
  if (typeof piece === "string") return escapeLatex(piece);
  switch (piece.kind) {
    case "formula":
      return `$${printFormula(piece.formula, "latex")}$`;
    case "term":
      return `$${printTerm(piece.term, "latex")}$`;
    case "relation":
      return relationAsMathematics(piece.name) ?? `\\textit{${escapeLatex(piece.name)}}`;
    case "cell":
    case "math":
      return `$${piece.latex}$`;
    case "strong":
      return `\\textbf{${escapeLatex(piece.text)}}`;
    case "code":
      return `\\texttt{${escapeLatex(piece.text)}}`;
    case "verdict":
      return `\\textbf{${escapeLatex(piece.word)}}${piece.leads ? ": " : ""}`;
  }
}

/** A relation by its name, as mathematics; null where that is a word. */
export function relationAsMathematics(name: string): string | null {
  if (/^\p{L}$/u.test(name)) return `$${name}$`;
  const sign = SIGNS.get(name);
  return sign === undefined ? null : `$${sign}$`;
}

function blockToLatex(block: Block): string {
  switch (block.kind) {
    case "line":
      return `\\noindent ${inlineToLatex(block.parts)}`;
    case "paragraph":
      return `\\noindent ${inlineToLatex(block.parts)}`;
    case "note":
      return `\\noindent\\emph{${inlineToLatex(block.parts)}}`;
    case "source":
      return block.text
        .split("\n")
        .map((text) => `\\noindent\\texttt{${escapeLatex(text)}}`)
        .join("\\\\\n");
    case "table":
      return tableToLatex(block);
    case "picture":
    case "gallery":
      return "";
    case "group":
    case "beside":
      return blocksToLatex(block.blocks);
    case "fold":
      return `\\noindent\\emph{${escapeLatex(block.title)}}\n\n${blocksToLatex(block.blocks)}`;
  }
}

function tableToLatex(table: TableBlock): string {
  const columns = columnsOf(table);
  // In ragged columns \\ ends a line of the cell.
  const isNarrow = table.look === "derivation" || table.look === "prose";
  const rowEnd = isNarrow ? "\\tabularnewline" : "\\\\";
  const isLong = longColumns(table);
  const row = (cells: readonly string[]) => `${cells.join(" & ")} ${rowEnd}`;
  const head = row(table.head.map(escapeLatex));
  // Sentences and reasons are in narrow columns, where lines of equal length would tear formulas apart.
  const isRagged = (column: number) =>
    (table.look === "derivation" && column > 0) ||
    (table.look === "prose" && (isLong[column]! || column === table.head.length - 1));
  const rows = table.rows.map((cells) =>
    row(
      cells.map((cell, column) => {
        const text = inlineToLatex(cell);
        return isRagged(column) ? `\\raggedright ${text}` : text;
      }),
    ),
  );
  const caption = table.caption === null ? "" : `\\noindent ${escapeLatex(table.caption)}\n\n`;
  if (table.rows.length > LONG_TABLE)
    return [
      `${caption}\\begin{longtable}{@{}${columns}@{}}`,
      `\\toprule\n${head}\n\\midrule\n\\endhead`,
      ...rows,
      "\\bottomrule\n\\end{longtable}",
    ].join("\n");
  return [
    `${caption}\\begin{center}\n\\begin{tabular}{@{}${columns}@{}}`,
    `\\toprule\n${head}\n\\midrule`,
    ...rows,
    "\\bottomrule\n\\end{tabular}\n\\end{center}",
  ].join("\n");
}

/** The column letters; long prose gets paragraphs. */
function columnsOf(table: TableBlock): string {
  const { look, head } = table;
  const last = head.length - 1;
  if (look === "numbers") return "r".repeat(last + 1);
  if (look === "matrix") return `c@{\\quad}${"c".repeat(last)}`;
  if (look === "derivation") return "rp{0.46\\linewidth}p{0.4\\linewidth}";
  if (look === "kinds") return `${longColumns(table)[0] ? "p{0.6\\linewidth}" : "l"}${"c".repeat(last)}`;
  const isLong = longColumns(table);
  const before = isLong.map((long) => (long && last > 0 ? "p{0.3\\linewidth}" : "l"));
  const most = last > 2 || isLong.includes(true) ? 0.4 : 0.65;
  const used = isLong.slice(0, last).map((long, column) => (long ? 0.3 : naturalShare(table, column)));
  const left = 0.98 - used.reduce((sum, share) => sum + share + BETWEEN_COLUMNS, 0);
  const rest = Math.max(0.3, Math.min(most, Math.floor(left * 100) / 100));
  return `${before.slice(0, last).join("")}p{${rest}\\linewidth}`;
}

/** Parts of the line that a character takes on the average, and the space between columns. */
const CHARACTER = 0.0135;
const BETWEEN_COLUMNS = 0.035;

/** The part of the line that a column takes by its widest cell. */
function naturalShare({ head, rows }: TableBlock, column: number): number {
  return CHARACTER * widestOf([head[column]!, ...rows.map((row) => inlineToText(row[column] ?? []))]);
}
