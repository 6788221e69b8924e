/**
 * Blocks as HTML that survives the sanitising of notebooks nobody has signed: tables with captions, `<details>`,
 * plain inline styles, and pictures as `<img>` with a data URI. It may stand on a light or a dark page, so text has
 * the page's own colour except where it brings its background with it; rules are of a middle grey that shows on both.
 */
import { printFormula, printTerm } from "../../lib/language/printer.ts";
import type { Block, Inline, PictureBlock, TableBlock } from "./blocks.ts";
import { displayWidth, visible } from "./text.ts";
import { inlineToText, longColumns } from "./to-text.ts";

const RULE = "#8a8a8a";

/** Background of a verdict's word: what is settled one way, settled the other way, and open. Text on it is white. */
const GROUND = { settled: "#235a5e", refuted: "#7a3140", open: "#5b5b5b" } as const;

const REFUTED: ReadonlySet<string> = new Set(["fails", "inconsistent", "redundant"]);

export function escapeHtml(text: string): string {
  return visible(text)
    .replace(/&/g, "&amp;")
    .replace(/</g, "&lt;")
    .replace(/>/g, "&gt;")
    .replace(/"/g, "&quot;")
    .replace(/'/g, "&#39;");
}

export function blocksToHtml(blocks: readonly Block[]): string {
  return `<div style="line-height:1.5">${blocks.map(blockToHtml).join("\n")}</div>`;
}

export function inlineToHtml(parts: readonly Inline[]): string {
  return parts.map(pieceToHtml).join("");
}

function pieceToHtml(piece: Inline): string {
  if (typeof piece === "string") return escapeHtml(piece);
  switch (piece.kind) {
    case "formula":
      return `<span>${escapeHtml(printFormula(piece.formula, "unicode"))}</span>`;
    case "term":
      return `<span>${escapeHtml(printTerm(piece.term, "unicode"))}</span>`;
    case "relation":
      return `<span>${escapeHtml(piece.name)}</span>`;
    case "math":
      return `<span style="white-space:nowrap">${escapeHtml(piece.text)}</span>`;
    case "strong":
      return `<strong>${escapeHtml(piece.text)}</strong>`;
    case "cell":
    case "code":
      return `<code>${escapeHtml(piece.text)}</code>`;
    case "verdict": {
      const ground =
        piece.word === "open" ? GROUND.open : REFUTED.has(piece.word) ? GROUND.refuted : GROUND.settled;
      return (
        `<strong style="background-color:${ground};color:#ffffff;padding:1px 7px;border-radius:3px;` +
        `white-space:nowrap">${escapeHtml(piece.word)}</strong>${piece.leads ? " " : ""}`
      );
    }
  }
}

function blockToHtml(block: Block): string {
  switch (block.kind) {
    case "line":
      return `<p style="margin:4px 0">${inlineToHtml(block.parts)}</p>`;
    case "paragraph":
      return `<p style="margin:10px 0 4px 0;max-width:46em">${heldPieces(block.parts)}</p>`;
    case "note":
      return `<p style="margin:4px 0;font-style:italic">${inlineToHtml(block.parts)}</p>`;
    case "source":
      return `<pre style="margin:4px 0;overflow-x:auto;white-space:pre-wrap">${escapeHtml(block.text)}</pre>`;
    case "table":
      return tableToHtml(block);
    case "picture": {
      return `<div style="margin:4px 0">${pictureToHtml(block)}${captionOf(block)}</div>`;
    }
    case "gallery": {
      const tiles = block.pictures.map(
        (picture) =>
          `<div style="${TILE}">${pictureToHtml(picture)}<br><small>${escapeHtml(picture.label)}</small></div>`,
      );
      const caption = block.caption === "" ? "" : `<div><small>${escapeHtml(block.caption)}</small></div>`;
      return `<div style="margin:6px 0">${tiles.join("")}${caption}</div>`;
    }
    case "beside":
      return `<div>${block.blocks
        .map((inner) => `<div style="${BESIDE}">${blockToHtml(inner)}</div>`)
        .join("")}</div>`;
    case "group":
      return `<div style="margin:10px 0 0 0">${block.blocks.map(blockToHtml).join("\n")}</div>`;
    case "fold":
      return (
        `<details style="margin:6px 0"><summary style="cursor:pointer">${escapeHtml(block.title)}</summary>` +
        `${block.blocks.map(blockToHtml).join("\n")}</details>`
      );
  }
}

const ALIGN = {
  matrix: "center",
  numbers: "right",
  prose: "left",
  derivation: "left",
  kinds: "center",
} as const;

const BESIDE = "display:inline-block;vertical-align:top;margin:0 28px 4px 0;max-width:100%";

const TILE =
  "display:inline-block;vertical-align:bottom;margin:0 14px 10px 0;max-width:100%;text-align:center;line-height:1.4";

function pictureToHtml({ svg, alt }: PictureBlock): string {
  const data = Buffer.from(svg, "utf8").toString("base64");
  return `<img src="data:image/svg+xml;base64,${data}" alt="${escapeHtml(alt)}" style="max-width:100%">`;
}

/** Captions beyond this length stand beside pictures up to this width, in pixels, where there is room. */
const LONG_CAPTION = 90;
const NARROW_PICTURE = 200;

function captionOf({ svg, caption }: PictureBlock): string {
  if (caption === "") return "";
  const width = Number(/ width="([\d.]+)"/.exec(svg)?.[1] ?? 0);
  const isBeside = caption.length > LONG_CAPTION && width < NARROW_PICTURE;
  const place = isBeside ? ";display:inline-block;vertical-align:bottom;padding:0 0 6px 10px" : "";
  const largest = isBeside ? 20 : 26;
  return `<div style="max-width:${largest}em${place}"><small>${escapeHtml(caption)}</small></div>`;
}

/** Columns that a sentence of a derivation, and a formula in its reason, may take to be kept on one line. */
const SENTENCE_WIDTH = 36;
const VALUE_WIDTH = 20;
/** Columns that the words for a kind of pairs may take to be kept on one line. */
const KIND_WIDTH = 56;

/** A cell of a derivation: browsers would break short formulas before they make the table wider. */
function derivationCell(cell: readonly Inline[], isLast: boolean): string {
  return heldPieces(cell, isLast ? VALUE_WIDTH : SENTENCE_WIDTH);
}

/** Prose in which no line ends inside a short formula. */
function heldPieces(parts: readonly Inline[], width = VALUE_WIDTH): string {
  return parts
    .map((piece) => {
      const isShort = typeof piece !== "string" && displayWidth(inlineToText([piece])) <= width;
      return isShort ? `<span style="white-space:nowrap">${pieceToHtml(piece)}</span>` : pieceToHtml(piece);
    })
    .join("");
}

function tableToHtml(table: TableBlock): string {
  const matrix = table.look === "matrix";
  const isBinary = matrix || table.look === "kinds";
  const align = (column: number) => (table.look === "kinds" && column === 0 ? "left" : ALIGN[table.look]);
  const space = {
    matrix: "1px 7px",
    numbers: "3px 4px 3px 18px",
    prose: "3px 14px 3px 4px",
    derivation: "2px 18px 2px 4px",
    kinds: "1px 9px 1px 4px",
  }[table.look];
  const isLong = longColumns(table);
  // Beside a long last column, browsers would break titles of several words after each of them.
  const isPhrase =
    table.look === "prose" && table.rows.some(([title]) => inlineToText(title ?? []).length > 20);
  const isReason = (column: number) => table.look === "derivation" && column === table.head.length - 1;
  const headCell = (title: string, column: number) =>
    `<th scope="col" style="text-align:${align(column)};padding:${space};border-bottom:1px solid ${RULE}${
      isLong[column] && table.look !== "kinds"
        ? ";width:16em"
        : isReason(column)
          ? ";min-width:15em"
          : column === 0 && isPhrase
            ? ";min-width:10em"
            : ""
    }">${escapeHtml(title)}</th>`;
  const rows = table.rows.map((row) => {
    const cells = row.map((cell, column) => {
      const inner =
        table.look === "derivation"
          ? derivationCell(cell, column === table.head.length - 1)
          : inlineToHtml(cell);
      if (column > 0)
        return `<td style="text-align:${align(column)};padding:${space};vertical-align:top">${
          isBinary && inner === "1" ? "<strong>1</strong>" : inner
        }</td>`;
      const rule = matrix ? `;border-right:1px solid ${RULE}` : "";
      const isHeld = displayWidth(inlineToText(cell)) <= KIND_WIDTH;
      const weight =
        table.look === "kinds" ? `;font-weight:normal${isHeld ? ";white-space:nowrap" : ""}` : "";
      return `<th scope="row" style="text-align:${align(column)};padding:${space};vertical-align:top${rule}${weight}">${inner}</th>`;
    });
    return `<tr>${cells.join("")}</tr>`;
  });
  const caption =
    table.caption === null
      ? ""
      : `<caption style="caption-side:top;text-align:left;padding:2px 4px;font-weight:bold">${escapeHtml(table.caption)}</caption>`;
  return (
    `<div style="overflow-x:auto;margin:4px 0"><table style="border-collapse:collapse;table-layout:auto;margin:0">${caption}` +
    `<thead><tr>${table.head.map(headCell).join("")}</tr></thead><tbody>${rows.join("")}</tbody></table></div>`
  );
}
