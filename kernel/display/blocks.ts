/**
 * What is shown, before it takes a form. An answer becomes a list of blocks once, and each form (plain text, HTML,
 * LaTeX) renders the same blocks, so that no form says more or less than another.
 */
import type { Term, TermFormula } from "../../lib/logic/clausal.ts";

/** Mathematics that is no formula of the language: `n²`, `φ(x, y)`. */
export interface Maths {
  readonly kind: "math";
  readonly text: string;
  readonly latex: string;
}

/** A piece of a line or of a table's cell. A bare string is prose. */
export type Inline =
  | string
  | { readonly kind: "formula"; readonly formula: TermFormula }
  | { readonly kind: "term"; readonly term: Term }
  /** A relation by its name alone. */
  | { readonly kind: "relation"; readonly name: string }
  | Maths
  /** What a paragraph begins with. */
  | { readonly kind: "strong"; readonly text: string }
  /** What the user wrote or named. */
  | { readonly kind: "code"; readonly text: string }
  /** Text of a cell that can also be set as mathematics. */
  | { readonly kind: "cell"; readonly text: string; readonly latex: string }
  /** A word of the closed lists of verdicts; one that leads a line is set off from what follows. */
  | { readonly kind: "verdict"; readonly word: string; readonly leads: boolean };

export interface TableBlock {
  readonly kind: "table";
  /** Null for a table that the line before it explains. */
  readonly caption: string | null;
  readonly head: readonly string[];
  /** Rows as long as the head; each cell a list of pieces. The first cell of a row is its head. */
  readonly rows: readonly (readonly (readonly Inline[])[])[];
  /**
   * `prose` wraps its last column; `matrix` sets every cell to the same width; `numbers` sets digits under digits;
   * `derivation` has a number, a formula and its reason in each row; `kinds` has 0 or 1 in all columns but the first.
   */
  readonly look: "prose" | "matrix" | "numbers" | "derivation" | "kinds";
}

export interface PictureBlock {
  readonly kind: "picture";
  /** A whole SVG document with a background of its own. */
  readonly svg: string;
  /** Says what can be seen, for those who cannot see it. */
  readonly alt: string;
  readonly caption: string;
}

export interface GalleryBlock {
  readonly kind: "gallery";
  readonly pictures: readonly (PictureBlock & { readonly label: string })[];
  /** What a reader of the pictures must know; empty where it stands below another row. */
  readonly caption: string;
}

export type Block =
  | { readonly kind: "line"; readonly parts: readonly Inline[] }
  /** Sentences that are read as a whole. */
  | { readonly kind: "paragraph"; readonly parts: readonly Inline[] }
  /** A remark that qualifies what stands above it. */
  | { readonly kind: "note"; readonly parts: readonly Inline[] }
  /** Text of a cell, to be copied; plain text and LaTeX have it too. */
  | { readonly kind: "source"; readonly text: string }
  | TableBlock
  /** Only in HTML: whatever a picture shows must stand in a table or list as well. */
  | PictureBlock
  /** Side by side where there is room. */
  | { readonly kind: "beside"; readonly blocks: readonly Block[] }
  /** Pictures with their numbers, in rows. Only in HTML, as every picture. */
  | GalleryBlock
  /** What belongs together, set off from what stands above. */
  | { readonly kind: "group"; readonly blocks: readonly Block[] }
  /** Closed at first in HTML; open in the other forms. */
  | { readonly kind: "fold"; readonly title: string; readonly blocks: readonly Block[] };

export function line(...parts: Inline[]): Block {
  return { kind: "line", parts };
}

export function note(...parts: Inline[]): Block {
  return { kind: "note", parts };
}

export function code(text: string): Inline {
  return { kind: "code", text };
}

export function verdict(word: string): Inline {
  return { kind: "verdict", word, leads: false };
}

export function leadingVerdict(word: string): Inline {
  return { kind: "verdict", word, leads: true };
}

export function formulaOf(formula: TermFormula): Inline {
  return { kind: "formula", formula };
}

export function termOf(term: Term): Inline {
  return { kind: "term", term };
}

export function mathOf(text: string, latex: string): Maths {
  return { kind: "math", text, latex };
}

export function cellOf(text: string, latex: string): Inline {
  return { kind: "cell", text, latex };
}

export function strong(text: string): Inline {
  return { kind: "strong", text };
}

/** Prose with pieces in it, as a template: words`Let ${x} be such.` */
export function words(
  strings: TemplateStringsArray,
  ...pieces: readonly (Inline | readonly Inline[])[]
): readonly Inline[] {
  return strings.flatMap((text, index): readonly Inline[] => {
    const piece = pieces[index];
    const before = text === "" ? [] : [text];
    if (piece === undefined) return before;
    return Array.isArray(piece) ? [...before, ...(piece as readonly Inline[])] : [...before, piece as Inline];
  });
}

/** `a`, `a and b`, `a, b and c`. */
export function enumerated(items: readonly Inline[]): readonly Inline[] {
  return items.flatMap((item, index): readonly Inline[] => {
    if (index === 0) return [item];
    return [index === items.length - 1 ? " and " : ", ", item];
  });
}
