/**
 * Relation terms, from the tightest sign to the loosest: `⁻¹`, `∁`, `∘`, `∩`, `∪`. A term is no formula by itself:
 * it is compared (`R ∘ R ⊆ R`), applied (`(R ∘ S)(x, y)`), or what a property is said of.
 */
import { type Formula, forall, iff, implies, not, type Variable, verum } from "../logic/formula.ts";
import { formulasIn, type RelationTerm, termFormula } from "../logic/terms.ts";
import { readArguments } from "./arguments.ts";
import type { Place } from "./diagnostics.ts";
import { findInexpressible } from "./inexpressible.ts";
import { readRun, type Token } from "./lexer.ts";
import { measureFormula } from "./measure.ts";
import { isVariable } from "./names.ts";
import { quote, type Reader, Unreadable } from "./reader.ts";
import { signOf } from "./tokens.ts";
import { countOf, kindText } from "./wording.ts";

const CONSTANTS: ReadonlySet<string> = new Set(["id", "full", "none"]);

/** The signs that make of a term a longer one, or a formula. */
const AFTER_TERM: ReadonlySet<Token["kind"]> = new Set([
  "inverse",
  "composition",
  "intersection",
  "union",
  "included",
  "equal",
  "not-equal",
]);

/** Whether a token after a term goes on with it, or compares it. */
export function continuesTerm(reader: Reader, token: Token): boolean {
  if (token.lineStart && reader.linesMatter) return false;
  if (token.kind === "word") return token.text === "o" && !token.group;
  return AFTER_TERM.has(token.kind) && token.text !== "inv";
}

/** Whether the formula that comes next begins with a term, judged by the tokens ahead. */
export function isTermAhead(reader: Reader): boolean {
  const token = reader.peek();
  const after = reader.peekAfter(1);
  switch (token.kind) {
    case "complement":
    case "inverse":
      return true;
    case "relation-sign":
      return continuesTerm(reader, after);
    case "open": {
      const group = reader.groupAhead();
      if (group === null) return false;
      const isApplied = group.after.kind === "open" && group.after.from === group.close.to;
      return isApplied || continuesTerm(reader, group.after);
    }
    case "word":
      if (CONSTANTS.has(token.text)) return true;
      if (isVariable(token.text) || !continuesTerm(reader, after)) return false;
      return reader.names.find(token.text) !== null || !isJuxtaposed(reader, token);
    default:
      return false;
  }
}

/** Whether a word reads as `Rxy`, a relation with its arguments. */
function isJuxtaposed(reader: Reader, word: Token): boolean {
  const letter = String.fromCodePoint(word.text.codePointAt(0)!);
  const { offsets } = readRun(reader.source, word, letter.length);
  return (
    !word.group &&
    offsets.length > 1 &&
    offsets.at(-1) === word.end - word.start &&
    reader.names.find(letter)?.kind === "relation"
  );
}

/**
 * Reads a term and what makes a formula of it.
 * @param use told of the variables that the term is applied to
 */
export function readTermFormula(reader: Reader, use: (variable: Variable, place: Place) => void): Formula {
  const first = reader.peek();
  const left = readTerm(reader);
  const text = reader.excerpt(first, reader.last);
  const sign = reader.peek();
  if (sign.kind === "open" && sign.from === reader.last.to) {
    const args = readArguments(reader, text, use);
    if (args !== null && args.length !== 2) {
      reader.report(
        "places-differ",
        { from: first.from, to: reader.last.to },
        `${quote(text)} has 2 places, and ${countOf(args.length, "argument")} ${args.length === 1 ? "is" : "are"} given`,
        `write \`${text}(x, y)\``,
      );
      return verum;
    }
    if (left === null || args === null) return verum;
    charge(reader, left, first);
    return termFormula(left, args[0]!, args[1]!);
  }
  if (!isComparison(sign))
    reader.failExpected(
      "`⊆` or `=` after a relation term",
      `a term is no formula: compare it, \`${text} ⊆ …\`, or apply it, \`(${text})(x, y)\``,
    );
  const right = readRightSide(reader);
  const chained = reader.peek();
  if (isComparison(chained)) {
    const middle = reader.excerpt(sign, reader.last).slice(sign.text.length).trim();
    reader.report(
      "chained",
      chained,
      `one comparison cannot follow another: ${quote(chained.text)} after ${quote(reader.excerpt(first, reader.last))}`,
      `write \`${reader.excerpt(first, reader.last)} ∧ ${middle} ${chained.text} …\``,
    );
    while (isComparison(reader.peek())) readRightSide(reader);
    return verum;
  }
  if (left === null || right === null) return verum;
  charge(reader, left, first);
  charge(reader, right, first);
  const [one, other] = [termFormula(left, "x", "y"), termFormula(right, "x", "y")];
  if (sign.kind === "included") return forall(["x", "y"], implies(one, other));
  const same = forall(["x", "y"], iff(one, other));
  return sign.kind === "equal" ? same : not(same);
}

function isComparison({ kind }: Token): boolean {
  return kind === "included" || kind === "equal" || kind === "not-equal";
}

function readRightSide(reader: Reader): RelationTerm | null {
  reader.next();
  reader.crossLine();
  return readTerm(reader);
}

/** Counts the formulas that a term puts into another, so many times. */
export function charge(reader: Reader, term: RelationTerm, place: Place, times = 1): void {
  let parts = 0;
  for (const formula of formulasIn(term)) parts += measureFormula(formula).parts;
  reader.charge(parts * times, place);
}

/** Reads a term; null after a mistake. Throws {@link Unreadable} when it is left in the middle. */
export function readTerm(reader: Reader): RelationTerm | null {
  const { level } = reader;
  const term = readUnion(reader);
  reader.level = level;
  return term;
}

function readUnion(reader: Reader): RelationTerm | null {
  return readChain(reader, "union", readIntersection);
}

function readIntersection(reader: Reader): RelationTerm | null {
  return readChain(reader, "intersection", readComposition);
}

function readComposition(reader: Reader): RelationTerm | null {
  return readChain(reader, "composition", readFactor);
}

/** Reads terms joined by one sign; each counts as a level, since the joined term nests that deeply. */
function readChain(
  reader: Reader,
  kind: "union" | "intersection" | "composition",
  readPart: (reader: Reader) => RelationTerm | null,
): RelationTerm | null {
  let left = readPart(reader);
  for (;;) {
    const sign = reader.peek();
    const isWord = kind === "composition" && reader.atWord("o");
    if (sign.kind !== kind && !isWord) return left;
    reader.next();
    reader.crossLine();
    reader.enter(sign);
    const right = readPart(reader);
    left = left === null || right === null ? null : { kind, left, right };
  }
}

function readFactor(reader: Reader): RelationTerm | null {
  const sign = reader.peek();
  if (sign.kind === "complement") {
    reader.next();
    reader.enter(sign);
    const of = readFactor(reader);
    return of === null ? null : { kind: "complement", of };
  }
  let term = readOperand(reader);
  for (let after = reader.peek(); after.kind === "inverse" && after.text !== "inv"; after = reader.peek()) {
    reader.next();
    reader.enter(after);
    term = term === null ? null : { kind: "converse", of: term };
  }
  return term;
}

function readOperand(reader: Reader): RelationTerm | null {
  const token = reader.peek();
  switch (token.kind) {
    case "open":
      return readGroup(reader);
    case "inverse": {
      if (token.text !== "inv") break;
      reader.next();
      if (!reader.at("open")) reader.failExpected("`(` after `inv`", "write `inv(R)`");
      const of = readGroup(reader);
      return of === null ? null : { kind: "converse", of };
    }
    case "relation-sign":
    case "word":
      return readName(reader, token);
    default:
  }
  return reader.failExpected("a relation or a relation term");
}

function readGroup(reader: Reader): RelationTerm | null {
  return readBracketed(reader, readTerm);
}

/** Reads a bracket, what is in it, and the bracket that closes it; null after a mistake inside. */
export function readBracketed<T>(reader: Reader, read: (reader: Reader) => T | null): T | null {
  const mark = reader.mark;
  const open = reader.next();
  reader.enter(open);
  const { level } = reader;
  return reader.withLines(false, () => {
    let found: T | null = null;
    try {
      found = read(reader);
      if (reader.at("comma"))
        reader.failExpected("`)`", "a property is said of one relation, and a term needs no arguments");
      reader.close(open, "a sign between relations, or `)`");
    } catch (error) {
      if (!(error instanceof Unreadable) || error.beyondBrackets || !reader.skipGroup(mark)) throw error;
      found = null;
    }
    reader.level = level - 1;
    return found;
  });
}

function readName(reader: Reader, name: Token): RelationTerm | null {
  if (CONSTANTS.has(name.text) && !name.group) {
    reader.next();
    return { kind: name.text as "id" };
  }
  const named = reader.names.find(name.text);
  if (named === null) return reportUnknown(reader, name);
  reader.next();
  switch (named.kind) {
    case "relation":
      if (named.relation.places === 2) return { kind: "relation", relation: named.relation };
      reportPlaces(reader, name, countOf(named.relation.places, "place"));
      return null;
    case "formula": {
      const { parameters, body } = named.definition;
      const [first, second] = parameters;
      if (parameters.length === 2) return { kind: "formula", parameters: [first!, second!], body };
      if (parameters.length > 0) reportPlaces(reader, name, countOf(parameters.length, "parameter"));
      else
        reader.report(
          "wrong-kind",
          name,
          `${quote(name.text)} is a sentence, where a relation is expected`,
          `between sentences write \`↔\`; a formula with two parameters, \`define Name(x, y) := …\`, is a relation`,
        );
      return null;
    }
    case "damaged":
      return null;
    default:
      reader.report(
        "wrong-kind",
        name,
        `${quote(name.text)} is ${kindText(named.kind)}, where a relation is expected`,
      );
      return null;
  }
}

function reportPlaces(reader: Reader, name: Token, has: string): void {
  reader.report(
    "places-differ",
    name,
    `${quote(name.text)} has ${has}, and only what has 2 can be a relation term`,
    `name what is meant with two parameters: \`define Name(x, y) := …\``,
  );
}

/** Reports a name that is not known, or no relation; null. */
function reportUnknown(reader: Reader, name: Token): null {
  const { names } = reader;
  const letter = String.fromCodePoint(name.text.codePointAt(0) ?? 0);
  const isCalled = reader.peekAfter(1).kind === "open" && reader.peekAfter(1).from === name.to;
  const refused = findInexpressible(name.text);
  if (name.kind === "relation-sign") return reader.failExpected("a relation or a relation term");
  reader.next();
  if (refused !== undefined) reportInexpressible(reader, name, refused);
  else if (isVariable(name.text))
    reader.report("unexpected", name, `${quote(name.text)} is a variable, where a relation is expected`);
  else if (isJuxtaposed(reader, name))
    reader.report(
      "unexpected",
      name,
      `${quote(name.text)} is a formula, where a relation is expected`,
      `write \`${letter}\`, without arguments; another formula needs a name: \`define Name(x, y) := …\``,
    );
  else {
    const near = names.nearest(name.text, ["relation", "formula"]);
    reader.report(
      "unknown-name",
      name,
      `there is no relation or formula ${quote(name.text)}`,
      near !== null ? `write \`${near}\`` : `declare it: \`relation ${name.text}\``,
    );
  }
  if (isCalled) {
    const mark = reader.mark;
    reader.next();
    if (!reader.skipGroup(mark)) throw new Unreadable(false);
  }
  return null;
}

/** Reports a name of what first-order logic cannot say. */
export function reportInexpressible(
  reader: Reader,
  place: Token,
  { word, reason, instead }: { readonly word: string; readonly reason: string; readonly instead: string },
): void {
  reader.report(
    "not-first-order",
    place,
    `${quote(word)} cannot be said in first-order logic: ${reason}`,
    instead,
  );
}

/** What to write for a sign of terms that stands between formulas; null for other tokens. */
export function hintBetweenFormulas(token: Token): string | null {
  const between = { union: "∨", intersection: "∧", composition: "∧", included: "→", equal: "↔" } as const;
  if (token.kind === "inverse" || !(token.kind in between)) return null;
  const symbol = signOf(token.kind as "union").symbol;
  return `\`${symbol}\` stands between relations without arguments, \`R ${symbol} S\`; between formulas write \`${between[token.kind as "union"]}\``;
}
