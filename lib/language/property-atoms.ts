/**
 * Sentences that a word says: properties of relations, `transitive(R)` or `transitive`; what first-order logic can
 * say no more of than an approximation, `acyclic up to 5`; numbers of elements, `at-most 3 points`.
 */
import { and, equal, exists, type Formula, forall, not, or, type Variable, verum } from "../logic/formula.ts";
import { findProperty, propertyFormula, propertyNames, propertyUses } from "../logic/properties.ts";
import type { RelationTerm } from "../logic/terms.ts";
import {
  ambiguousProperties,
  findInexpressible,
  type Inexpressible,
  inexpressibles,
} from "./inexpressible.ts";
import type { Token } from "./lexer.ts";
import { nearestName } from "./nearest.ts";
import { readWhole } from "./numbers.ts";
import { MAX_NESTING, quote, type Reader, Unreadable } from "./reader.ts";
import { standIn } from "./sole-relation.ts";
import { charge, continuesTerm, readBracketed, readTerm, reportInexpressible } from "./terms.ts";

const CARDINALS: ReadonlySet<string> = new Set(["at-most", "at-least", "exactly"]);

/** Each step of a path nests two levels deeper. */
const MOST_STEPS = MAX_NESTING / 2 - 10;
/** Each element has its quantifier. */
const MOST_POINTS = MAX_NESTING / 4;

/** Words that begin such a sentence, for completion. */
export const sentenceWords: readonly string[] = [
  ...propertyNames,
  ...inexpressibles.filter(({ approximate }) => approximate !== null).map(({ word }) => `${word} up to`),
  ...CARDINALS,
];

/** Whether a word is the name of a property, or of what is refused as one. */
export function isPropertyWord(word: string): boolean {
  return (
    findProperty(word) !== undefined || findInexpressible(word) !== undefined || ambiguousProperties.has(word)
  );
}

/** Whether the word that comes next begins such a sentence; names of the user's own go before. */
export function isPropertyAhead(reader: Reader, word: Token): boolean {
  if (word.group) return false;
  if (CARDINALS.has(word.text) && ["number", "minus"].includes(reader.peekAfter(1).kind)) return true;
  return isPropertyWord(word.text) && reader.names.find(word.text) === null;
}

/** The property that a misspelled word may be meant for; null when none is near. */
export function nearestProperty(word: string): string | null {
  return nearestName(word, propertyNames);
}

/**
 * Reads such a sentence, of which {@link isPropertyAhead} has seen the word.
 * @param bare takes the word when it is said of no relation: the formula then has the stand-in
 */
export function readPropertySentence(reader: Reader, bare: Token[]): Formula {
  const word = reader.next();
  if (CARDINALS.has(word.text) && reader.names.find(word.text) === null) return readCardinality(reader, word);
  const property = findProperty(word.text);
  if (property !== undefined) {
    const term = readSubject(reader, word, bare);
    if (term === null) return verum;
    charge(reader, term, word, propertyUses(property));
    return propertyFormula(property, term);
  }
  const inexpressible = findInexpressible(word.text);
  if (inexpressible !== undefined) return readApproximation(reader, word, inexpressible, bare);
  reader.report(
    "ambiguous",
    word,
    `${quote(word.text)} has more than one meaning`,
    `write ${ambiguousProperties.get(word.text)}`,
  );
  return passOver(reader, word);
}

function isCalled(reader: Reader, word: Token): boolean {
  return reader.at("open") && reader.peek().from === word.to;
}

/** Reads `(R)` after a property, or takes it to be bare; null after a mistake. */
function readSubject(reader: Reader, word: Token, bare: Token[]): RelationTerm | null {
  if (isCalled(reader, word)) return readBracketed(reader, readTerm);
  const next = reader.peek();
  const named = next.kind === "word" ? reader.names.find(next.text) : null;
  if (named?.kind === "relation")
    reader.fail(
      "missing-bracket",
      next,
      `a property is said of ${quote(next.text)} in brackets`,
      `write \`${word.text}(${next.text})\``,
    );
  bare.push(word);
  return { kind: "relation", relation: standIn };
}

function readApproximation(
  reader: Reader,
  word: Token,
  inexpressible: Inexpressible,
  bare: Token[],
): Formula {
  const { approximate } = inexpressible;
  const ownBare: Token[] = [];
  let term: RelationTerm | null = null;
  if (approximate !== null) term = readSubject(reader, word, ownBare);
  if (approximate === null || !reader.atWord("up")) {
    reportInexpressible(reader, word, inexpressible);
    return passOver(reader, word);
  }
  reader.next();
  reader.expectWord("to", `write \`${word.text} up to 5\``);
  const steps = readWhole(reader, "up to how many steps", MOST_STEPS);
  if (term === null || steps === null) return verum;
  bare.push(...ownBare);
  charge(reader, term, word, 2 * steps);
  return approximate(term, steps);
}

/** Passes over what is said of a word that has been refused: its arguments, and the rest of a term. */
function passOver(reader: Reader, word: Token): Formula {
  if (isCalled(reader, word)) {
    const mark = reader.mark;
    reader.next();
    if (!reader.skipGroup(mark)) throw new Unreadable(false);
  }
  if (continuesTerm(reader, reader.peek())) throw new Unreadable(false);
  return verum;
}

function readCardinality(reader: Reader, word: Token): Formula {
  const count = readWhole(reader, "how many points there are", MOST_POINTS);
  if (reader.acceptWord("points") === null && reader.acceptWord("point") === null)
    reader.failExpected("`points`", `write \`${word.text} ${count ?? 3} points\``);
  if (count === null) return verum;
  const variables = names(count + 1);
  const some = variables.slice(0, count);
  const atMost = exists(
    some,
    forall(variables.at(-1)!, or(...some.map((one) => equal(variables.at(-1)!, one)))),
  );
  const atLeast = exists(
    some,
    and(...some.flatMap((one, index) => some.slice(index + 1).map((other) => not(equal(one, other))))),
  );
  if (word.text === "at-most") return atMost;
  if (word.text === "at-least") return atLeast;
  // `exactly 1 point` needs no second sentence: domains are not empty.
  return count === 1 ? atMost : and(atLeast, atMost);
}

function names(count: number): readonly Variable[] {
  return count <= 3 ? ["x", "y", "z"].slice(0, count) : Array.from({ length: count }, (_, i) => `x${i + 1}`);
}
