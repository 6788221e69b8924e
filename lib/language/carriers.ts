/**
 * Infinite domains as they are written: `dense-line in 2 colours`, `tuples (a, b) over half-line`,
 * `integer-line at each point of dense-line`, `sum of (2 copies of half-line) and points 1`.
 */
import {
  type CarrierDescription,
  countComponents,
  GENERIC_CLASSES,
  LARGEST_DOMAIN,
  MOST_COLOURS,
  MOST_COMPONENTS,
  type TuplesDescription,
} from "../logic/structure-definition.ts";
import { carrierHelp, SIMPLE_CARRIERS } from "./carrier-help.ts";
import type { Place } from "./diagnostics.ts";
import { listWords } from "./help.ts";
import type { Token } from "./lexer.ts";
import { isKeptWord, type Names } from "./names.ts";
import { nearestName } from "./nearest.ts";
import { readWhole } from "./numbers.ts";
import { quote, type Reader } from "./reader.ts";

/** The names that coordinates have, each with its number. */
export type CoordinateNames = ReadonlyMap<TuplesDescription, ReadonlyMap<string, number>>;

export interface CarrierReading {
  /** Differences are told apart as little as can be: bounds are chosen from what is said of the elements. */
  readonly description: CarrierDescription;
  readonly coordinates: CoordinateNames;
}

/** Whether a token is that word, however it is set in LaTeX. */
export function isWord(token: Token, ...words: readonly string[]): boolean {
  return token.kind === "word" && words.includes(token.text);
}

/** Whether a token is `and`, the sign or in LaTeX the word between parts of a structure. */
export function isAnd(token: Token): boolean {
  return token.kind === "and" || isWord(token, "and");
}

/** Whether a carrier, or what can only be meant for one, begins at the token after so many others. */
export function isCarrierAhead(reader: Reader, after = 0): boolean {
  return beginsCarrier((count) => reader.peekAfter(after + count), reader.names);
}

/**
 * Whether a carrier, or what can only be meant for one, begins at a token.
 * @param tokenAt the token so many places after that one
 */
export function beginsCarrier(tokenAt: (count: number) => Token, names: Names): boolean {
  let at = 0;
  while (tokenAt(at).kind === "open") at += 1;
  const token = tokenAt(at);
  const next = tokenAt(at + 1);
  if (token.kind === "number") return next.kind === "word" && !next.lineStart;
  if (token.kind !== "word" || names.find(token.text) !== null) return false;
  if (token.text === "points" || SIMPLE_CARRIERS.some((word) => word === token.text)) return true;
  if (next.lineStart) return false;
  if (token.text === "generic") return next.kind === "word";
  if (token.text === "rooted") return isWord(next, "tree", "forest");
  if (token.text === "tree" || token.text === "forest") return isWord(next, "with", "of");
  if (token.text === "tuples") return next.kind === "open" || isWord(next, "of", "over");
  if (token.text === "sum") return isWord(next, "of");
  // An unknown word, taken for the name of a carrier.
  return isWord(next, "where") || (isWord(next, "at") && isWord(tokenAt(at + 2), "each"));
}

/** The words that a carrier may begin with. */
export const carrierWords: readonly string[] = [
  "points",
  ...carrierHelp.map(({ word }) => word).filter((word) => word !== "copies" && word !== "at each point of"),
];

/** Goes on to the next part, definition or table over `and`, `,` or both; whether there is one. */
export function acceptSeparator(reader: Reader): boolean {
  const isComma = reader.accept("comma") !== null;
  if (isComma) reader.crossLine();
  const isJoined = isAnd(reader.peek());
  if (isJoined) reader.next();
  if (!isComma && !isJoined) return false;
  reader.crossLine();
  return true;
}

/** Reads a carrier; null after a mistake about numbers or names. */
export function readCarrier(reader: Reader): CarrierReading | null {
  const first = reader.peek();
  const mistakes = reader.diagnostics.length;
  const { level } = reader;
  const carriers = new CarrierReader(reader);
  const description = carriers.read();
  reader.level = level;
  if (reader.diagnostics.length > mistakes) return null;
  const components = countComponents(description);
  if (components > MOST_COMPONENTS) {
    reader.report(
      "size-too-large",
      { from: first.from, to: reader.last.to },
      `this carrier has ${components} components; the most is ${MOST_COMPONENTS}`,
      "take fewer copies, parts or coordinates",
    );
    return null;
  }
  return { description, coordinates: carriers.coordinates };
}

class CarrierReader {
  readonly #reader: Reader;
  readonly coordinates = new Map<TuplesDescription, ReadonlyMap<string, number>>();

  constructor(reader: Reader) {
    this.#reader = reader;
  }

  read(): CarrierDescription {
    const token = this.#reader.peek();
    if (token.kind === "number") return this.#copies();
    if (this.#isComposite(token)) return token.text === "sum" ? this.#sum() : this.#tuples();
    const inner = this.#operand();
    if (!this.#acceptWord("at")) return inner;
    for (const word of ["each", "point", "of"])
      this.#expectWord(word, "a copy of A at every element of B is written `A at each point of B`");
    const outer = this.#operand();
    if (isWord(this.#reader.peek(), "at"))
      this.#reader.failExpected("the end of the carrier", "put `A at each point of B` in brackets");
    return { kind: "product", outer, inner };
  }

  #isComposite(token: Token): boolean {
    return isWord(token, "sum", "tuples") && this.#reader.names.find(token.text) === null;
  }

  /** Reads a carrier that stands by itself, or one in brackets. */
  #operand(): CarrierDescription {
    const reader = this.#reader;
    const token = reader.peek();
    if (token.kind === "number" || this.#isComposite(token))
      reader.failExpected("a carrier that is made of no others", "put it in brackets");
    if (token.kind !== "open") return this.#simple();
    const open = reader.next();
    reader.enter(open);
    const { level } = reader;
    const description = reader.withLines(false, () => {
      const read = this.read();
      reader.close(open, "`)`");
      return read;
    });
    reader.level = level - 1;
    return description;
  }

  #simple(): CarrierDescription {
    const reader = this.#reader;
    const word = reader.peek();
    switch (word.kind === "word" ? word.text : "") {
      case "points":
        reader.next();
        return { kind: "points", size: this.#whole("how many points there are", LARGEST_DOMAIN) };
      case "dense-line": {
        reader.next();
        if (!this.#acceptWord("in")) return { kind: "dense-line", colours: 1 };
        const colours = this.#whole("how many colours there are", MOST_COLOURS);
        this.#oneOrMany(colours, "colour", "colours", "write `dense-line in 2 colours`");
        return { kind: "dense-line", colours };
      }
      case "integer-line":
        reader.next();
        return { kind: "integer-line", offset: 0 };
      case "half-line":
        reader.next();
        return { kind: "half-line", offset: 0, ends: 0 };
      case "dense-tree":
        reader.next();
        return { kind: "dense-tree" };
      case "boolean-algebra":
        reader.next();
        return this.#booleanAlgebra();
      case "generic":
        reader.next();
        return this.#generic();
      case "rooted":
      case "tree":
      case "forest":
        return this.#tree(this.#acceptWord("rooted"));
      default:
        return this.#unknown(word);
    }
  }

  #unknown(word: Token): CarrierDescription {
    const reader = this.#reader;
    if (word.kind !== "word" || isKeptWord(word.text))
      return reader.failExpected("a carrier", `carriers are ${listWords(carrierWords.map(quote))}`);
    reader.next();
    const named = reader.names.find(word.text);
    const near = nearestName(word.text, carrierWords) ?? nearestCarrierTo(word.text, reader.peek());
    if (named !== null && named.kind !== "damaged")
      reader.report(
        "wrong-kind",
        word,
        `${quote(word.text)} is a ${named.kind}, where a carrier is expected`,
        near === null ? null : `write \`${near}\``,
      );
    else
      reader.report(
        "unknown-name",
        word,
        `there is no carrier ${quote(word.text)}`,
        near === null ? `carriers are ${listWords(carrierWords.map(quote))}` : `write \`${near}\``,
      );
    return { kind: "dense-line", colours: 1 };
  }

  #booleanAlgebra(): CarrierDescription {
    const reader = this.#reader;
    if (!this.#acceptWord("without")) return { kind: "boolean-algebra", zero: true, top: true };
    const hint = "write `boolean-algebra without zero`, or `without zero and top`";
    if (isWord(reader.peek(), "top"))
      reader.failExpected("`zero`", `${hint}: without its top alone it looks like that upside down`);
    this.#expectWord("zero", hint);
    const isTopless = isAnd(reader.peek()) && isWord(reader.peekAfter(1), "top");
    if (isTopless) {
      reader.next();
      reader.next();
    }
    return { kind: "boolean-algebra", zero: false, top: !isTopless };
  }

  #generic(): CarrierDescription {
    const reader = this.#reader;
    const word = reader.peek();
    const of = GENERIC_CLASSES.find((one) => isWord(word, one));
    if (of === undefined) {
      const near = word.kind === "word" ? nearestName(word.text, GENERIC_CLASSES) : null;
      return reader.failExpected(
        `${listWords(GENERIC_CLASSES.map(quote), "or")} after \`generic\``,
        near === null ? null : `write \`generic ${near}\``,
      );
    }
    reader.next();
    return { kind: "generic", of };
  }

  #tree(rooted: boolean): CarrierDescription {
    const hint = `write \`${rooted ? "rooted " : ""}tree with 2 children\``;
    if (!this.#acceptWord("forest")) this.#expectWord("tree", hint);
    this.#expectWord("with", hint);
    const branching = this.#whole("how many children each element has", MOST_COMPONENTS);
    this.#oneOrMany(branching, "child", "children", hint);
    return { kind: "forest", branching, rooted, offset: 0, ends: 0 };
  }

  #copies(): CarrierDescription {
    const count = this.#whole("how many copies there are", MOST_COMPONENTS);
    const hint = "write `2 copies of dense-line`";
    this.#oneOrMany(count, "copy", "copies", hint);
    this.#expectWord("of", hint);
    const over = this.#operand();
    const widths = Array.from({ length: count }, () => 1);
    if (this.#acceptWord("with")) {
      const points = this.#whole("how many single points there are", MOST_COMPONENTS);
      this.#oneOrMany(points, "point", "points", "write `2 copies of dense-line with 1 point`");
      for (let point = 0; point < points; point += 1) widths.push(0);
    }
    return { kind: "tuples", over, widths };
  }

  #sum(): CarrierDescription {
    const reader = this.#reader;
    const hint = "write `sum of half-line and points 1`";
    reader.next();
    this.#expectWord("of", hint);
    const parts = [this.#operand()];
    while (acceptSeparator(reader)) {
      parts.push(this.#operand());
    }
    if (parts.length < 2) reader.failExpected("`and` and another part of the sum", hint);
    return { kind: "sum", parts };
  }

  /** Reads `tuples (a, b), (a) over …` or `tuples of 2, 1 over …`. */
  #tuples(): CarrierDescription {
    const reader = this.#reader;
    const hint = "write `tuples (a, b) over dense-line` or `tuples of 2 over dense-line`";
    reader.next();
    const widths: number[] = [];
    const names = new Map<string, number>();
    if (this.#acceptWord("of"))
      do {
        if (reader.at("number") && /^0+$/.test(reader.peek().text)) {
          reader.next();
          widths.push(0);
        } else widths.push(this.#whole("how many coordinates the tuples have", MOST_COMPONENTS));
      } while (reader.accept("comma") !== null);
    else if (reader.at("open"))
      do widths.push(this.#coordinateNames(names));
      while (reader.accept("comma") !== null);
    else reader.failExpected("`of` or the names of the coordinates", hint);
    this.#expectWord("over", hint);
    const description: TuplesDescription = { kind: "tuples", over: this.#operand(), widths };
    this.coordinates.set(description, names);
    return description;
  }

  /** Reads `(a, b)`, which may be empty; adds the names and returns how many there are. */
  #coordinateNames(names: Map<string, number>): number {
    const reader = this.#reader;
    const open = reader.expect("open", "the coordinates of each length are named in brackets of their own");
    return reader.withLines(false, () => {
      if (reader.accept("close") !== null) return 0;
      const own = new Set<string>();
      do {
        const token = reader.peek();
        if (token.kind !== "word") reader.failExpected("the name of a coordinate");
        reader.next();
        this.#checkCoordinate(token, own, names.get(token.text));
        own.add(token.text);
        if (!names.has(token.text)) names.set(token.text, own.size);
      } while (reader.accept("comma") !== null);
      reader.close(open, "`,` or `)`");
      return own.size;
    });
  }

  #checkCoordinate(token: Token, own: ReadonlySet<string>, known: number | undefined): void {
    const shown = quote(token.text);
    const suggestion = "take another name";
    if (own.has(token.text))
      this.#reader.report("label-twice", token, `two coordinates are called ${shown}`, suggestion);
    else if (known !== undefined && known !== own.size + 1)
      this.#reader.report(
        "label-twice",
        token,
        `${shown} is coordinate ${known} of other tuples here, and would be coordinate ${own.size + 1}`,
        suggestion,
      );
    else if (isKeptWord(token.text) || isWord(token, "outer", "inner"))
      this.#reader.report(
        "kept-word",
        token,
        `${shown} is a word of the language and cannot be the name of a coordinate`,
        suggestion,
      );
  }

  // Words and numbers

  #acceptWord(word: string): boolean {
    if (!isWord(this.#reader.peek(), word)) return false;
    this.#reader.next();
    return true;
  }

  #expectWord(word: string, hint: string): void {
    if (!this.#acceptWord(word)) this.#reader.failExpected(`\`${word}\``, hint);
  }

  /** Reads `colour` or `colours`, whichever fits the number or not. */
  #oneOrMany(count: number, one: string, many: string, hint: string): void {
    if (!this.#acceptWord(one) && !this.#acceptWord(many))
      this.#reader.failExpected(`\`${count === 1 ? one : many}\``, hint);
  }

  /** Reads a number from 1 on; 1 after a mistake. */
  #whole(what: string, most: number): number {
    return readWhole(this.#reader, what, most) ?? 1;
  }
}

/** `linear order` and the like are left alone: the nearest carrier of two words, by its words. */
function nearestCarrierTo(word: string, next: Token): string | null {
  if (next.kind !== "word") return null;
  const pair = `${word} ${next.text}`;
  return nearestName(
    pair,
    carrierWords.filter((one) => one.includes(" ")),
  );
}

/** Where a path from an element leads: the carriers that what it leads to may be an element of. */
export interface PathStep {
  readonly step: number | "outer" | "inner";
  readonly carriers: readonly CarrierDescription[];
}

/** The carriers that an element may be in: those of the parts, for a sum. */
export function withParts(carriers: readonly CarrierDescription[]): readonly CarrierDescription[] {
  return carriers.flatMap((carrier) => (carrier.kind === "sum" ? withParts(carrier.parts) : [carrier]));
}

/**
 * Resolves one step of a path, written as a number or a name.
 * @param carriers where the path has led so far, parts of sums apart
 * @returns null after a report
 */
export function resolveStep(
  reader: Reader,
  text: string,
  place: Place,
  carriers: readonly CarrierDescription[],
  coordinates: CoordinateNames,
): PathStep | null {
  const tuples = carriers.filter((carrier) => carrier.kind === "tuples");
  const products = carriers.filter((carrier) => carrier.kind === "product");
  const known = new Map<string, number>();
  for (const carrier of tuples)
    for (const [name, number] of coordinates.get(carrier) ?? []) known.set(name, number);
  const widest = Math.max(0, ...tuples.flatMap(({ widths }) => widths));
  const number = /^[0-9]+$/.test(text) ? Number(text) : known.get(text);
  if (number !== undefined && number >= 1 && number <= widest)
    return { step: number, carriers: withParts(tuples.map(({ over }) => over)) };
  if ((text === "outer" || text === "inner") && products.length > 0)
    return { step: text, carriers: withParts(products.map((product) => product[text])) };
  const words = [...known.keys(), ...(products.length > 0 ? ["outer", "inner"] : [])];
  const near = nearestName(text, words);
  const there = [
    ...(widest === 0 ? [] : [widest === 1 ? "`.1`" : `\`.1\` to \`.${widest}\``]),
    ...words.map((word) => `\`.${word}\``),
  ];
  reader.report(
    "unknown-name",
    place,
    there.length === 0
      ? `the elements have no components here, so there is no ${quote(`.${text}`)}`
      : `there is no component ${quote(`.${text}`)} here`,
    near !== null
      ? `write \`.${near}\``
      : there.length === 0
        ? "leave it out"
        : `components are ${listWords(there)}`,
  );
  return null;
}
