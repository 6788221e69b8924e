/**
 * The tokens of a cell as the parser walks over them: where lines and statements end, how a mistake is reported,
 * and how reading goes on after it.
 */
import type { Diagnostic, Place } from "./diagnostics.ts";
import { helpOf, laterStatements } from "./help.ts";
import { readTokens, type Token, type TokenKind } from "./lexer.ts";
import type { Names } from "./names.ts";
import { keptSymbols, mistakenSigns, type SignKind, signOf } from "./tokens.ts";

/**
 * How many brackets, negations, quantifiers and conditionals may lie one inside another, in the text and in the
 * formula that it stands for. Every function in lib that follows a formula by recursion is safe with that many.
 */
export const MAX_NESTING = 400;
/** After that many mistakes the rest of a cell is not read. */
export const MAX_MISTAKES = 200;
/** How many parts of formulas a cell may make, definitions unfolded. */
export const MAX_PARTS = 5_000_000;

/** Ends the reading of an axiom, a group or a statement after its mistake has been reported. */
export class Unreadable extends Error {
  /** Whether the innermost bracket is no place to go on: only the axiom or the statement is. */
  readonly beyondBrackets: boolean;

  constructor(beyondBrackets: boolean) {
    super("unreadable cell text");
    this.beyondBrackets = beyondBrackets;
  }
}

/** Ends the reading of the cell after a mistake that concerns all of it. */
export class CellEnds extends Error {}

/** Text from the user as messages show it: in backquotes, cut at 40 characters. */
export function quote(text: string): string {
  const points = [...(text.length > 200 ? text.slice(0, 200) : text)];
  return points.length > 40 ? `\`${points.slice(0, 39).join("")}…\`` : `\`${text}\``;
}

/** How many brackets are open, and how many of them are braces. */
export interface Mark {
  readonly open: number;
  readonly braces: number;
}

export class Reader {
  readonly source: string;
  readonly names: Names;
  readonly diagnostics: Diagnostic[] = [];
  /** How deep the reading is in brackets, negations, quantifiers and right sides of conditionals. */
  level = 0;
  /** Whether the end of a line ends what is being read: not inside brackets. */
  linesMatter = true;
  /** Whether a label at the beginning of a line, `mid: …`, begins an axiom. */
  inTheory = false;
  readonly #tokens: Token[];
  readonly #rawTokens: readonly Token[];
  #index = 0;
  /** The token at which the statement or axiom begins: no end is seen before it. */
  #fresh = 0;
  /** A token before which the end of a line has been passed over. */
  #crossed = -1;
  /** The brackets that are open, innermost last. */
  readonly #open: ("open" | "open-brace")[] = [];
  #braceCount = 0;
  #unknownSeen = -1;
  #lineEnd: Token | null = null;
  #parts = 0;
  #closers: ReadonlyMap<number, number> | null = null;

  constructor(source: string, names: Names) {
    this.source = source;
    this.names = names;
    this.#tokens = readTokens(source);
    this.#rawTokens = this.#tokens.filter(({ kind }) => kind === "raw");
  }

  // Walking

  /** The next token, or one of kind `end` at the end of the line, the statement or the cell. */
  peek(): Token {
    const token = this.#tokens[this.#index]!;
    if (!token.lineStart || token.kind === "end" || this.#index === this.#fresh) return token;
    if (this.#beginsAnew(this.#index) || (this.linesMatter && this.#index !== this.#crossed))
      return this.#endOfLine();
    return token;
  }

  /** The token after so many others, whatever line it is on. */
  peekAfter(count: number): Token {
    return this.#tokens[Math.min(this.#index + count, this.#tokens.length - 1)]!;
  }

  /** The bracket that closes the next token, which opens one, and the token after it; null if none closes it. */
  groupAhead(): { readonly close: Token; readonly after: Token } | null {
    this.#closers ??= matchBrackets(this.#tokens);
    const at = this.#closers.get(this.#index);
    return at === undefined ? null : { close: this.#tokens[at]!, after: this.#tokens[at + 1]! };
  }

  /** The last token that was read. */
  get last(): Token {
    return this.#tokens[Math.max(0, this.#index - 1)]!;
  }

  /** The number of the next token; grows with every token read. */
  get position(): number {
    return this.#index;
  }

  /** Reads the next token; one of kind `end` stays where it is. */
  next(): Token {
    const token = this.peek();
    if (token.kind !== "end") this.#pass();
    return token;
  }

  at(kind: TokenKind): boolean {
    return this.peek().kind === kind;
  }

  atWord(word: string): boolean {
    const token = this.peek();
    return token.kind === "word" && token.text === word && !token.group;
  }

  /** Reads on to the next comma, or to the end of the line or statement. */
  skipToComma(): void {
    while (!this.at("comma") && !this.at("semicolon") && !this.at("end")) this.next();
  }

  /** Reads a token of that kind if it comes next. */
  accept(kind: TokenKind): Token | null {
    return this.at(kind) ? this.next() : null;
  }

  acceptWord(word: string): Token | null {
    return this.atWord(word) ? this.next() : null;
  }

  /** Lets what is being read go on over the end of the line, as after an operator. */
  crossLine(): void {
    this.#crossed = this.#index;
  }

  /** Puts the rest of a word that was read in part in its place. */
  replaceNext(rest: Token): void {
    this.#tokens[this.#index] = rest;
  }

  /** Runs a part of the parser in which the end of a line means nothing, or something. */
  withLines<T>(matter: boolean, read: () => T): T {
    const before = this.linesMatter;
    this.linesMatter = matter;
    try {
      return read();
    } finally {
      this.linesMatter = before;
    }
  }

  #pass(): void {
    const token = this.#tokens[this.#index]!;
    switch (token.kind) {
      case "unknown":
        this.#reportUnknown();
        break;
      case "open":
      case "open-brace":
        this.#open.push(token.kind);
        if (token.kind === "open-brace") this.#braceCount += 1;
        break;
      case "close":
        if (this.#open.at(-1) === "open") this.#open.pop();
        break;
      case "close-brace":
        if (this.#braceCount === 0) break;
        // Brackets that were left open inside the braces end with them.
        while (this.#open.pop() !== "open-brace");
        this.#braceCount -= 1;
        break;
      default:
    }
    this.#index += 1;
  }

  /** Whether a statement, or in a theory a labelled axiom, plainly begins at a token, whatever is still open. */
  #beginsAnew(index: number): boolean {
    const token = this.#tokens[index]!;
    if (!token.lineStart || token.kind === "end" || index === this.#fresh) return false;
    const labelled = this.#tokens[index + 1]?.kind === "colon";
    if (labelled) return this.inTheory;
    return token.kind === "word" && isStatementWord(token.text);
  }

  #endOfLine(): Token {
    const before = this.#tokens[this.#index - 1]!;
    if (this.#lineEnd === null || this.#lineEnd.start !== before.end)
      this.#lineEnd = {
        kind: "end",
        text: "line",
        from: before.to,
        to: before.to,
        start: before.end,
        end: before.end,
        lineStart: false,
        group: false,
      };
    return this.#lineEnd;
  }

  // Statements and axioms

  /** Whether all tokens have been read. */
  get isDone(): boolean {
    return this.#tokens[this.#index]!.kind === "end";
  }

  /** Begins a statement or an axiom at the next token. */
  begin(): void {
    this.#fresh = this.#index;
  }

  /** Begins a statement: nothing is open any more. */
  beginStatement(): void {
    this.begin();
    this.level = 0;
    this.linesMatter = true;
    this.inTheory = false;
    this.#open.length = 0;
    this.#braceCount = 0;
  }

  /** The brackets that are open now. */
  get mark(): Mark {
    return { open: this.#open.length, braces: this.#braceCount };
  }

  /** Reads on to the next statement. */
  skipStatement(): void {
    this.inTheory = false;
    for (; !this.isDone; this.#pass()) {
      if (this.#beginsAnew(this.#index)) return;
      if (this.#open.length > 0 || this.#index === this.#fresh) continue;
      const token = this.#tokens[this.#index]!;
      if (token.kind === "semicolon") return;
      if (token.lineStart && !continuesLine(this.last)) return;
    }
  }

  /**
   * Reads on to the next axiom, or to the brace that closes the theory.
   * @param mark the brackets that were open when the theory's axioms began
   */
  skipAxiom(mark: Mark): void {
    for (; !this.isDone; this.#pass()) {
      if (this.#beginsAnew(this.#index)) break;
      if (this.#braceCount > mark.braces) continue;
      const token = this.#tokens[this.#index]!;
      if (token.kind === "semicolon" || token.kind === "close-brace") break;
      if (this.#index === this.#fresh || this.#open.length > mark.open) continue;
      if (token.lineStart && !continuesLine(this.last)) break;
    }
    // Brackets that the axiom left open end with it.
    if (this.#braceCount === mark.braces && this.#open.length > mark.open) this.#open.length = mark.open;
  }

  /**
   * Reads on past the bracket that closes a group.
   * @param mark the brackets that were open before the group
   * @param stop what may end the search before that, beside the ends of axiom, theory and statement
   * @returns whether the closing bracket was there
   */
  skipGroup(mark: Mark, stop?: TokenKind): boolean {
    for (; !this.isDone; this.#pass()) {
      if (this.#beginsAnew(this.#index)) return false;
      const token = this.#tokens[this.#index]!;
      if (this.#open.length === mark.open + 1) {
        if (token.kind === "close") {
          this.#pass();
          return true;
        }
        if (token.kind === stop) return false;
      }
      if (this.#braceCount > mark.braces) continue;
      if (token.kind === "close-brace" || token.kind === "semicolon") return false;
    }
    return false;
  }

  // Mistakes

  report(code: string, place: Place, message: string, suggestion: string | null = null): void {
    this.diagnostics.push({ code, message, from: place.from, to: place.to, suggestion });
    if (this.diagnostics.length < MAX_MISTAKES) return;
    const end = this.#tokens.at(-1)!;
    this.diagnostics.push({
      code: "too-many-mistakes",
      message: `more than ${MAX_MISTAKES} mistakes: the rest of the cell was not read`,
      from: Math.min(place.to, end.to),
      to: end.to,
      suggestion: null,
    });
    throw new CellEnds();
  }

  /** Reports a mistake and ends the reading of the group, the axiom or the statement. */
  fail(code: string, place: Place, message: string, suggestion: string | null = null): never {
    this.report(code, place, message, suggestion);
    throw new Unreadable(false);
  }

  /** Reports that something else was expected at the next token. */
  failExpected(expected: string, suggestion: string | null = null): never {
    const token = this.peek();
    if (token.kind === "unknown") {
      this.#reportUnknown();
      throw new Unreadable(false);
    }
    if (token.kind === "relation-sign" && this.names.find(token.text) === null)
      this.fail(
        "unknown-symbol",
        token,
        `${quote(token.text)} is not known here: expected ${expected}`,
        hintFor(token),
      );
    if (token.kind === "close" && this.#open.at(-1) !== "open")
      this.fail("unmatched-bracket", token, "no `(` is open that this `)` could close", "leave it out");
    if (token.kind === "close-brace" && this.#braceCount === 0)
      this.fail("unmatched-bracket", token, "no `{` is open that this `}` could close", "leave it out");
    this.fail("unexpected", token, `expected ${expected}, found ${describeToken(token)}`, suggestion);
  }

  /** Reads a token of that kind, or reports that it is missing. */
  expect(kind: SignKind, suggestion: string | null = null): Token {
    if (!this.at(kind)) this.failExpected(`\`${signOf(kind).symbol}\``, suggestion);
    return this.next();
  }

  expectWord(word: string, suggestion: string | null = null): Token {
    if (!this.atWord(word)) this.failExpected(`\`${word}\``, suggestion);
    return this.next();
  }

  /** Reads the bracket that closes `open`; at the end of what is being read, reports `open` as not closed. */
  close(open: Token, expected: string): Token {
    if (this.at("close")) return this.next();
    const found = this.peek();
    if (!["end", "close-brace", "semicolon", "entails", "does-not-entail", "assign"].includes(found.kind))
      return this.failExpected(expected);
    const end =
      found.kind !== "end" ? quote(found.text) : `the end of the ${found.text === "line" ? "line" : "cell"}`;
    return this.fail("missing-bracket", open, `this \`(\` is not closed before ${end}`, "put in a `)`");
  }

  /** Goes one level in, or reports that the text is nested too deeply. */
  enter(place: Place): void {
    this.level += 1;
    if (this.level > MAX_NESTING) this.failNested(place);
  }

  failNested(place: Place): never {
    this.report(
      "nested-too-deep",
      place,
      `nested more than ${MAX_NESTING} levels`,
      "name parts of it with `define`, or use fewer brackets, negations, quantifiers and conditionals",
    );
    throw new Unreadable(true);
  }

  /** Counts parts of formulas that are made; ends the cell when there are too many. */
  charge(parts: number, place: Place): void {
    this.#parts += parts;
    if (this.#parts <= MAX_PARTS) return;
    this.endCell(
      `with all definitions unfolded, the formulas of this cell have more than ${MAX_PARTS} parts`,
      place,
    );
  }

  /** Reports that the cell is too large, and ends it. */
  endCell(message: string, place: Place = this.peek()): never {
    this.report("cell-too-large", place, message, "divide the cell");
    throw new CellEnds();
  }

  /** Reports a run of unknown characters that begins at the next token, once. */
  #reportUnknown(): void {
    if (this.#index <= this.#unknownSeen) return;
    let end = this.#index;
    while (
      this.#tokens[end + 1]?.kind === "unknown" &&
      this.#tokens[end + 1]!.start === this.#tokens[end]!.end
    )
      end += 1;
    this.#unknownSeen = end;
    const first = this.#tokens[this.#index]!;
    const last = this.#tokens[end]!;
    this.report(
      "unknown-symbol",
      { from: first.from, to: last.to },
      `the language has no ${quote(this.source.slice(first.start, last.end))}`,
      hintFor(first),
    );
  }

  // Source text

  /** The source between two tokens, without comments and with single spaces. */
  excerpt(first: Token, last: Token): string {
    return this.statementText(first, last).replace(/\s+/gu, " ").trim();
  }

  /** The source between two tokens, without comments; its lines as they are. */
  statementText(first: Token, last: Token): string {
    let text = "";
    let at = first.start;
    // In SMT-LIB text the sign # begins no comment.
    for (const { start, end } of this.#rawTokens) {
      if (start < first.start || end > last.end) continue;
      text += withoutComments(this.source.slice(at, start)) + this.source.slice(start, end);
      at = end;
    }
    return text + withoutComments(this.source.slice(at, last.end));
  }
}

/** For each bracket that opens, by the number of its token, the one that closes it. */
function matchBrackets(tokens: readonly Token[]): ReadonlyMap<number, number> {
  const closers = new Map<number, number>();
  const open: number[] = [];
  tokens.forEach(({ kind }, index) => {
    if (kind === "open" || kind === "open-brace") open.push(index);
    else if (kind === "close" && tokens[open.at(-1) ?? 0]!.kind === "open") closers.set(open.pop()!, index);
    else if (kind === "close-brace") {
      // Brackets that were left open inside the braces end with them.
      const brace = open.findLastIndex((at) => tokens[at]!.kind === "open-brace");
      if (brace < 0) return;
      closers.set(open[brace]!, index);
      open.length = brace;
    }
  });
  return closers;
}

function withoutComments(text: string): string {
  if (!text.includes("#")) return text;
  return text
    .split("\n")
    .map((line) => ({ line, kept: line.replace(/#.*$/su, "").trimEnd() }))
    .filter(({ line, kept }) => kept !== "" || line.trim() === "")
    .map(({ kept }) => kept)
    .join("\n");
}

/** Whether a word begins a statement of this version or of a later one. */
export function isStatementWord(word: string): boolean {
  return helpOf(word) !== undefined || laterStatements.includes(word);
}

/** Whether a line that ends in this token goes on in the next one. */
export function continuesLine(token: Token): boolean {
  switch (token.kind) {
    case "word":
      return token.text === "where" || token.text === "iff";
    case "number":
    case "raw":
    case "end":
    case "unknown":
      return false;
    case "relation-sign":
    case "comma":
      return true;
    default: {
      const { role } = signOf(token.kind);
      return !["bracket", "constant", "postfix"].includes(role) && token.kind !== "semicolon";
    }
  }
}

/** A token as messages name what was found. */
export function describeToken(token: Token): string {
  if (token.kind === "end") return token.text === "line" ? "the end of the line" : "the end of the cell";
  if (token.kind === "raw") return "text in SMT-LIB";
  if (token.kind === "number") return `the number ${quote(token.text)}`;
  return quote(token.text);
}

/** What to do about a sign that is not known: write one of ours, or declare it. */
export function hintFor(token: Token): string | null {
  if (keptSymbols.has(token.text)) return "the converse of a relation is written `R⁻¹` or `inv(R)`";
  const sign = mistakenSigns.get(token.text);
  const isDeclarable = token.kind === "relation-sign" && (sign === undefined || !/^[ -~]*$/.test(token.text));
  const declaration = isDeclarable ? `declare it: \`relation ${token.text} infix\`` : null;
  if (sign === undefined) return declaration;
  return declaration === null ? `write ${sign}` : `write ${sign}, or ${declaration}`;
}
