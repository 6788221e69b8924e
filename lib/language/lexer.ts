/** Cell text to tokens. Any text has tokens: what the language does not know becomes tokens of kind `unknown`. */
import type { Place } from "./diagnostics.ts";
import { clusters, mistakenSigns, relationSigns, type SignKind, signs } from "./tokens.ts";

/**
 * `raw`: what stands between the braces of `smt-lib { … }`, its tokens being those of another language. `word`: a name, label, variable, run of variables or keyword; `number`: begins with a digit; `relation-sign`: a
 * symbol that may be declared as a relation; `end`: the end of the text, once, last.
 */
export type TokenKind = SignKind | "raw" | "word" | "number" | "relation-sign" | "unknown" | "end";

export interface Token extends Place {
  readonly kind: TokenKind;
  /**
   * What it stands for: of a word the name, with primes and lower digits in ASCII (`x₁′` and `x_{1}'` are `x1'`)
   * and in normal form C; of a relation sign the symbol, though it was written `\prec`.
   */
  readonly text: string;
  /** Where it stands in UTF-16 units, for slicing the source; `from` and `to` are code points. */
  readonly start: number;
  readonly end: number;
  /** Whether it is the first token on its line. */
  readonly lineStart: boolean;
  /** For a word written in a LaTeX group: it is one name and no run of variables. */
  readonly group: boolean;
}

const SPACE = /[\p{Z}\t\v\f\uFEFF\u200B]+/uy;
const LINE_END = /\r\n|[\n\r\u0085\u2028\u2029]/y;
const COMMENT = /#[^\n\r\u0085\u2028\u2029]*/y;
const WORD = /\p{L}(?:_\{[0-9]+\}|[\p{L}\p{M}\p{Nd}_'′’₀-₉]|-[\p{L}\p{Nd}])*/uy;
const NUMBER = /[0-9](?:[\p{L}\p{Nd}_]|\.[0-9])*/uy;
/** Commands that stand for space, and commands before a bracket that only change its size. */
const LATEX_SPACE = /\\(?:[,;:! ]|(?:quad|qquad|left|right|bigl|bigr|Bigl|Bigr)(?![a-zA-Z]))/y;
const LATEX_LINE_END = /\\\\/y;
/** A name in a group, `\mathit{Between}` or `\mathrel{\mathit{before}}`; the name is in group 1 or 2. */
const LATEX_NAME =
  /\\(?:mathit|mathrm|mathsf|textit|text|operatorname)\{((?:[^{}\\\n]|\\_)*)\}|\\(?:mathrel|mathbin|mathord)\{\\(?:mathit|mathrm|mathsf|textit|text)\{((?:[^{}\\\n]|\\_)*)\}\}/uy;
/** A relation sign in a group, `\mathrel{≺}` or `\mathrel{\prec}`; the sign is in group 1. */
const LATEX_SIGN = /\\(?:mathrel|mathbin|mathord)\{(\\[a-zA-Z]+|[^{}\\\s]{1,3})\}/uy;
const LATEX_COMMAND = /\\(?:[a-zA-Z]+|[{}])/y;
/** A symbol that may be declared, with accents set on it. */
const RELATION_SIGN = /[\p{Sm}\p{So}*/@]\p{M}*/uy;

/** Spellings that are no words: kind by text. */
const signKinds = new Map<string, SignKind>();
/** Spellings that are words: kind by text. */
const wordKinds = new Map<string, SignKind>();
for (const sign of signs) {
  // `o` is a variable as well: only the reader of terms can tell.
  for (const spelling of [sign.symbol, ...sign.ascii])
    if (spelling !== "o") (/^\p{L}/u.test(spelling) ? wordKinds : signKinds).set(spelling, sign.kind);
  for (const command of sign.latex) signKinds.set(command, sign.kind);
}
const relationCommands = new Map(
  relationSigns.flatMap((sign) => sign.latex.map((command) => [command, sign.symbol] as const)),
);

/** The combining long solidus overlay, which makes `≠` of `=`. */
const COMBINING_STROKE = 0x338;
/** Signs of one UTF-16 unit with which no longer sign begins, by that unit: the lexer's short cut. */
const SINGLE = new Map(
  [...signKinds]
    .filter(([text]) => text.length === 1 && !clusters.some((cluster) => cluster.startsWith(text)))
    .map(([text, kind]) => [text.charCodeAt(0), { text, kind }] as const),
);

/** How many UTF-16 units at the beginning of a text are one word; 0 when it begins with none. */
export function wordLength(text: string): number {
  WORD.lastIndex = 0;
  return WORD.exec(text)?.[0].length ?? 0;
}

/** Whether the word is a spelling of a sign, such as `forall`. */
export function isSignWord(word: string): boolean {
  return wordKinds.has(word);
}

/**
 * Whether a symbol can be declared as a relation: one sign, or a cluster such as `<=`, that the language does not
 * use itself. Clusters that are taken for signs of the language elsewhere, such as `&&`, cannot.
 */
export function isRelationSign(text: string): boolean {
  if (signKinds.has(text)) return false;
  RELATION_SIGN.lastIndex = 0;
  if (clusters.includes(text)) return !mistakenSigns.has(text);
  return RELATION_SIGN.exec(text)?.[0] === text;
}

/** The tokens of a text, ending with one of kind `end`. Linear in its length; never throws. */
export function readTokens(source: string): Token[] {
  const tokens: Token[] = [];
  const counter = new PointCounter(source);
  let at = 0;
  let lineStart = true;
  const matchAt = (pattern: RegExp): RegExpExecArray | null => {
    pattern.lastIndex = at;
    return pattern.exec(source);
  };
  const add = (kind: TokenKind, text: string, end: number, group = false) => {
    const from = counter.pointsBefore(at);
    tokens.push({ kind, text, from, to: counter.pointsBefore(end), start: at, end, lineStart, group });
    at = end;
    lineStart = false;
  };
  while (at < source.length) {
    const code = source.charCodeAt(at);
    if (code === 0x20 || code === 0x0a) {
      if (code === 0x0a) lineStart = true;
      at += 1;
      continue;
    }
    const single = SINGLE.get(code);
    if (single !== undefined && source.charCodeAt(at + 1) !== COMBINING_STROKE) {
      const isForeign = single.kind === "open-brace" && isSmtLib(tokens.at(-1));
      add(single.kind, single.text, at + 1);
      if (isForeign) {
        const end = endOfSmtLib(source, at);
        add("raw", source.slice(at, end), end);
      }
      continue;
    }
    const word = matchAt(WORD);
    if (word !== null) {
      addWord(word[0], at + word[0].length);
      continue;
    }
    const found = matchAt(SPACE) ?? matchAt(COMMENT);
    if (found !== null) {
      at += found[0].length;
      continue;
    }
    const lineEnd = matchAt(LINE_END) ?? matchAt(LATEX_LINE_END);
    if (lineEnd !== null) {
      at += lineEnd[0].length;
      lineStart = true;
      continue;
    }
    const number = matchAt(NUMBER);
    if (number !== null) {
      add("number", number[0], at + number[0].length);
      continue;
    }
    if (source[at] === "\\") {
      readCommand();
      continue;
    }
    const cluster = clusters.find((candidate) => source.startsWith(candidate, at));
    if (cluster !== undefined) {
      add(signKinds.get(cluster) ?? "relation-sign", cluster, at + cluster.length);
      continue;
    }
    const symbol = String.fromCodePoint(source.codePointAt(at)!);
    // The stroke makes another sign of one of ours: `=` with U+0338 is `≠`.
    const struck = source.charCodeAt(at + symbol.length) === COMBINING_STROKE;
    const composed = struck ? `${symbol}\u0338`.normalize("NFC") : symbol;
    const kind = signKinds.get(composed);
    const sign = kind === undefined ? matchAt(RELATION_SIGN) : null;
    if (kind !== undefined) add(kind, composed, at + symbol.length + (struck ? 1 : 0));
    else if (sign !== null) add("relation-sign", sign[0].normalize("NFC"), at + sign[0].length);
    else add("unknown", symbol, at + symbol.length);
  }
  add("end", "", source.length);
  return tokens;

  function addWord(raw: string, end: number, group = false): void {
    const text = nameOf(raw);
    add((group ? undefined : wordKinds.get(text)) ?? "word", text, end, group);
  }

  function readCommand(): void {
    const space = matchAt(LATEX_SPACE);
    if (space !== null) {
      at += space[0].length;
      return;
    }
    const name = matchAt(LATEX_NAME);
    const inside = name === null ? undefined : (name[1] ?? name[2]!).replaceAll("\\_", "_").trim();
    WORD.lastIndex = 0;
    if (name !== null && WORD.exec(inside!)?.[0] === inside) {
      addWord(inside!, at + name[0].length, true);
      return;
    }
    const grouped = matchAt(LATEX_SIGN);
    const sign = grouped === null ? undefined : (relationCommands.get(grouped[1]!) ?? grouped[1]!);
    if (sign !== undefined && isRelationSign(sign)) {
      add("relation-sign", sign.normalize("NFC"), at + grouped![0].length);
      return;
    }
    const command = matchAt(LATEX_COMMAND)?.[0] ?? "\\";
    const relation = relationCommands.get(command);
    if (relation !== undefined) add("relation-sign", relation, at + command.length);
    else add(signKinds.get(command) ?? "unknown", command, at + command.length);
  }
}

/** Whether a token is the word `smt-lib`. */
export function isSmtLib(token: Token | undefined): boolean {
  return token?.kind === "word" && token.text.toLowerCase() === "smt-lib";
}

/** What in SMT-LIB text may have braces inside: comments, quoted symbols and strings, closed or not. */
const SMT_LIB_OPAQUE = /[^;|"{}]+|;[^\n\r]*|\|[^|]*(?:\||$)|"(?:[^"]|"")*(?:"|$)|\{/y;

/** Where the brace stands that closes SMT-LIB text; the end of the source if none does. */
function endOfSmtLib(source: string, from: number): number {
  SMT_LIB_OPAQUE.lastIndex = from;
  let end = from;
  while (SMT_LIB_OPAQUE.test(source)) end = SMT_LIB_OPAQUE.lastIndex;
  return end;
}

/** The name that a word stands for; see {@link Token.text}. */
function nameOf(raw: string): string {
  if (/^[A-Za-z0-9'-]*$/.test(raw)) return raw;
  return raw
    .replace(/_\{([0-9]+)\}/g, "$1")
    .replace(/[₀-₉]/g, (digit) => String(digit.charCodeAt(0) - 0x2080))
    .replace(/[′’]/g, "'")
    .normalize("NFC");
}

/** One variable of a run such as `xyz` or `x₁y'`. */
export interface Segment extends Place {
  readonly text: string;
}

const SEGMENT = /([a-z])((?:[0-9₀-₉]|_\{[0-9]+\})*)(['′’]*)/y;

/**
 * Reads a word as a run of variables from its beginning, or from its second letter on.
 * @returns the variables up to the first character that does not belong to one, and the UTF-16 offset in the word
 *   at which each begins and the last ends
 */
export function readRun(
  source: string,
  word: Token,
  skip: number,
): { readonly segments: readonly Segment[]; readonly offsets: readonly number[] } {
  const raw = source.slice(word.start, word.end);
  const segments: Segment[] = [];
  const offsets: number[] = [skip];
  SEGMENT.lastIndex = skip;
  // The letters of variables are ASCII, so code points and UTF-16 units agree after the letters skipped.
  const shift = word.from + (skip > 1 ? 1 - skip : 0);
  for (let match = SEGMENT.exec(raw); match !== null; match = SEGMENT.exec(raw)) {
    segments.push({ text: nameOf(match[0]), from: shift + match.index, to: shift + SEGMENT.lastIndex });
    offsets.push(SEGMENT.lastIndex);
    if (SEGMENT.lastIndex === raw.length) break;
  }
  return { segments, offsets };
}

/** What is left of a word from a UTF-16 offset on that {@link readRun} gave. */
export function restOfWord(source: string, word: Token, offset: number): Token {
  const raw = source.slice(word.start + offset, word.end);
  const text = nameOf(raw);
  return {
    kind: wordKinds.get(text) ?? "word",
    text,
    from: word.from + offset,
    to: word.to,
    start: word.start + offset,
    end: word.end,
    lineStart: false,
    group: false,
  };
}

/** Counts code points up to growing UTF-16 offsets. A lone surrogate counts as one. */
class PointCounter {
  readonly #source: string;
  readonly #plain: boolean;
  #unit = 0;
  #points = 0;

  constructor(source: string) {
    this.#source = source;
    this.#plain = !/[\uD800-\uDFFF]/.test(source);
  }

  /** How many code points begin before the offset; offsets must not decrease from call to call. */
  pointsBefore(offset: number): number {
    if (this.#plain) return offset;
    while (this.#unit < offset) {
      this.#unit += this.#source.codePointAt(this.#unit)! > 0xffff ? 2 : 1;
      this.#points += 1;
    }
    return this.#points;
  }
}
