/** Plain text for people: how wide it is on the screen, and how numbers and lists are worded. */

/** Ranges of code points that take two columns in a fixed-width font (Unicode's East Asian Width W and F). */
const WIDE: readonly (readonly [number, number])[] = [
  [0x1100, 0x115f],
  [0x2e80, 0x303e],
  [0x3041, 0x33ff],
  [0x3400, 0x4dbf],
  [0x4e00, 0xa4cf],
  [0xa960, 0xa97f],
  [0xac00, 0xd7a3],
  [0xf900, 0xfaff],
  [0xfe30, 0xfe6f],
  [0xff00, 0xff60],
  [0xffe0, 0xffe6],
  [0x1f300, 0x1f64f],
  [0x1f680, 0x1f6ff],
  [0x1f900, 0x1f9ff],
  [0x20000, 0x3fffd],
];

/** The columns that one code point takes in a fixed-width font: 0, 1 or 2. */
export function columnsOf(character: string): number {
  const code = character.codePointAt(0) ?? 0;
  if (code < 0x300) return 1;
  if (/^[\p{Mn}\p{Me}\p{Cf}]$/u.test(character)) return 0;
  return WIDE.some(([first, last]) => code >= first && code <= last) ? 2 : 1;
}

/** The columns that a text takes in a fixed-width font. */
export function displayWidth(text: string): number {
  let width = 0;
  for (const character of text) width += columnsOf(character);
  return width;
}

/** The columns that the widest of some texts takes; there may be very many. */
export function widestOf(texts: readonly string[]): number {
  return texts.reduce((widest, text) => Math.max(widest, displayWidth(text)), 0);
}

/** The text with spaces after it, up to a width in columns. */
export function padEnd(text: string, width: number): string {
  return text + " ".repeat(Math.max(0, width - displayWidth(text)));
}

/** The text with spaces before it, up to a width in columns. */
export function padStart(text: string, width: number): string {
  return " ".repeat(Math.max(0, width - displayWidth(text))) + text;
}

/**
 * Names as they can safely be shown: control characters and those that change the direction of what follows would
 * make a line read as something else, and become `�`.
 */
export function visible(text: string): string {
  return text.replace(
    /[\p{Cc}\u2028\u2029\u202a-\u202e\u2066-\u2069\u200e\u200f\ufeff]|[\ud800-\udfff]/gu,
    (found) => (found === "\n" || found === "\t" ? found : "\ufffd"),
  );
}

/** The text cut to a width in columns, with `…` where something was left out. */
export function shorten(text: string, width: number): string {
  if (displayWidth(text) <= width) return text;
  let kept = "";
  let used = 0;
  for (const character of text) {
    used += columnsOf(character);
    if (used > width - 1) break;
    kept += character;
  }
  return `${kept}…`;
}

/** The text broken at spaces into lines of at most so many columns; a longer word keeps a line to itself. */
export function wrap(text: string, width: number): readonly string[] {
  const lines: string[] = [];
  let line = "";
  for (const word of text.split(" ")) {
    const longer = line === "" ? word : `${line} ${word}`;
    if (line !== "" && displayWidth(longer) > width) {
      lines.push(line);
      line = word;
    } else line = longer;
  }
  lines.push(line);
  return lines;
}

/** Digits beyond which a number is told by its length. */
const LONGEST_NUMBER = 60;

/** A whole number with commas between thousands; a very long one is told by its first digits and their number. */
export function grouped(value: number | bigint): string {
  const digits = String(value);
  if (digits.length > LONGEST_NUMBER) return `${digits.slice(0, 12)}… (${grouped(digits.length)} digits)`;
  return digits.replace(/\B(?=(\d{3})+$)/g, ",");
}

/** `1 point`, `3 points`. */
export function counted(count: number | bigint, noun: string, nouns = `${noun}s`): string {
  return `${grouped(count)} ${count === 1 || count === 1n ? noun : nouns}`;
}

/** The sizes from 1 on: `on 1 point`, `on 1 to 8 points`. */
export function onSizesTo(size: number): string {
  return size === 1 ? "on 1 point" : `on 1 to ${grouped(size)} points`;
}

/** `a`, `a and b`, `a, b and c`. */
export function enumerate(items: readonly string[]): string {
  if (items.length <= 1) return items.join("");
  return `${items.slice(0, -1).join(", ")} and ${items.at(-1)}`;
}

/** A noun phrase with its indefinite article. */
export function withArticle(noun: string): string {
  return `${/^[aeiou]/i.test(noun) ? "an" : "a"} ${noun}`;
}
