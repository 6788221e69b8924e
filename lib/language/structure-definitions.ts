/** What structures on infinite domains are made of: `where Rxy iff x < y, and Sx iff x = 0`. */
import { buildCarrier } from "../carriers/build.ts";
import { fitCarrier, largestBound } from "../carriers/fit.ts";
import { countKinds } from "../carriers/listing.ts";
import { vocabularyOf } from "../carriers/vocabulary/of.ts";
import { atomsOf } from "../logic/carrier-formulas.ts";
import type { RelationSymbol } from "../logic/formula.ts";
import {
  type CarrierDescription,
  type DefinedRelation,
  LARGEST_OFFSET,
  LARGEST_TABLES,
} from "../logic/structure-definition.ts";
import { readArguments } from "./arguments.ts";
import { CarrierFormulaReader, type PlacedAtom } from "./carrier-formulas.ts";
import { type CarrierReading, isWord } from "./carriers.ts";
import type { Place } from "./diagnostics.ts";
import { readRun, type Token } from "./lexer.ts";
import { isVariable } from "./names.ts";
import { quote, type Reader } from "./reader.ts";
import { callForm, countOf, kindText } from "./wording.ts";

/** Tokens of the brackets after the name of a relation that are looked at for an `iff` behind them. */
const FARTHEST = 210;

/** Truth values of atoms that the tables of a structure may take, all relations together. */
const MOST_VALUES = 2_000_000;

/** Whether the definition of a relation, up to its `iff`, begins at the token after so many others. */
export function isDefinitionAhead(reader: Reader, after = 0): boolean {
  const at = (count: number) => reader.peekAfter(after + count);
  const isIff = (count: number) => isWord(at(count), "iff");
  const [first, second] = [at(0), at(1)];
  if (first.kind !== "word" && first.kind !== "relation-sign") return false;
  if (second.kind === "open") {
    let count = 2;
    while (count < FARTHEST && (at(count).kind === "word" || at(count).kind === "comma")) count += 1;
    return at(count).kind === "close" && isIff(count + 1);
  }
  if (isIff(1)) return true;
  return (second.kind === "word" || second.kind === "relation-sign") && at(2).kind === "word" && isIff(3);
}

interface Head extends Place {
  /** Of the relation. */
  readonly name: string;
  /** Null when it is unknown, which has been reported, or damaged. */
  readonly relation: RelationSymbol | null;
  /** Null after a mistake. */
  readonly variables: readonly string[] | null;
  /** As the definition is called in messages: `R(x, y)`. */
  readonly text: string;
}

/** What definitions come to: the carrier with the bounds that they need. */
export interface DefinitionsReading {
  readonly carrier: CarrierDescription;
  readonly relations: readonly DefinedRelation[];
}

/** Reads the definitions of relations on one carrier. */
export class DefinitionReader {
  readonly #reader: Reader;
  readonly #carrier: CarrierReading | null;
  readonly #formulas: CarrierFormulaReader;
  readonly #found: DefinedRelation[] = [];
  /** Where each of these is. */
  readonly #places: Place[] = [];
  readonly #seen: Set<string>;

  /**
   * @param carrier null when a mistake hides it
   * @param seen the names of relations that have been given; definitions add theirs
   */
  constructor(reader: Reader, carrier: CarrierReading | null, seen: Set<string>) {
    this.#reader = reader;
    this.#carrier = carrier;
    this.#seen = seen;
    this.#formulas = new CarrierFormulaReader(reader, carrier, () => isDefinitionAhead(reader, 1));
  }

  /** Reads the definition that comes next. */
  read(): void {
    const reader = this.#reader;
    const mistakes = reader.diagnostics.length;
    const next = reader.peekAfter(1);
    if (isWord(next, "is") && !next.lineStart) this.#failListed();
    const head = readHead(reader);
    if (this.#seen.has(head.name))
      reader.report(
        "relation-twice",
        head,
        `${quote(head.name)} is defined twice`,
        "join the formulas with `or`",
      );
    this.#seen.add(head.name);
    readIff(reader, head);
    const formula = this.#formulas.read(head);
    const { relation, variables } = head;
    if (relation === null || variables === null || reader.diagnostics.length > mistakes) return;
    this.#found.push({ relation, variables, formula });
    this.#places.push({ from: head.from, to: head.to });
  }

  #failListed(): never {
    const reader = this.#reader;
    const { text } = reader.next();
    const named = reader.names.find(text);
    const head = named?.kind === "relation" ? callForm(text, named.relation.places) : text;
    return reader.failExpected(
      "`iff` after a relation with its variables",
      `write \`${head} iff …\`: tuples are listed on \`points n\` alone`,
    );
  }

  /** What has been read; null after a mistake, also about what the formulas say. */
  finish(): DefinitionsReading | null {
    if (this.#carrier === null) return null;
    const reader = this.#reader;
    const mistakes = reader.diagnostics.length;
    const carrier = fitToAtoms(reader, this.#carrier.description, this.#formulas.atoms);
    if (reader.diagnostics.length > mistakes) return null;
    checkTables(reader, carrier, this.#found, this.#places);
    return reader.diagnostics.length > mistakes ? null : { carrier, relations: this.#found };
  }
}

function readIff(reader: Reader, head: Head): void {
  const token = reader.peek();
  if (isWord(token, "iff")) reader.next();
  else if (token.kind === "iff" || token.kind === "assign") {
    reader.report("unexpected", token, `expected \`iff\`, found ${quote(token.text)}`, "write `iff`");
    reader.next();
  } else reader.failExpected("`iff`", `write \`${head.text} iff …\``);
  reader.crossLine();
}

// The relation and its variables

function readHead(reader: Reader): Head {
  const first = reader.peek();
  if (first.kind !== "word" && first.kind !== "relation-sign")
    reader.failExpected("a relation with its variables, such as `Rxy`");
  const second = reader.peekAfter(1);
  if (second.kind === "open") return readCalled(reader, first);
  const isInfix =
    isVariable(first.text) &&
    (second.kind === "relation-sign" || (second.kind === "word" && !isWord(second, "iff")));
  return isInfix ? readInfix(reader, first) : readJuxtaposed(reader, first);
}

/** `R(x, y)`. */
function readCalled(reader: Reader, name: Token): Head {
  reader.next();
  const relation = resolveRelation(reader, name, name.text);
  const variables = readArguments(reader, name.text, () => {});
  const place = { from: name.from, to: reader.last.to };
  if (variables === null) return { ...place, name: name.text, relation, variables, text: name.text };
  return headOf(reader, place, name.text, relation, variables);
}

/** `x ≺ y`. */
function readInfix(reader: Reader, left: Token): Head {
  reader.next();
  const name = reader.next();
  const right = reader.peek();
  if (right.kind !== "word" || !isVariable(right.text))
    reader.failExpected(`a variable after ${quote(name.text)}`);
  reader.next();
  const relation = resolveRelation(reader, name, name.text);
  const place = { from: left.from, to: right.to };
  if (relation !== null && !relation.infix) {
    reader.report(
      "not-infix",
      name,
      `${quote(name.text)} was not declared to stand between its arguments`,
      `write \`${callForm(name.text, relation.places)}\``,
    );
    return { ...place, name: name.text, relation: null, variables: null, text: name.text };
  }
  return headOf(reader, place, name.text, relation, [left.text, right.text]);
}

/** `Rxy`. */
function readJuxtaposed(reader: Reader, word: Token): Head {
  reader.next();
  const letter = String.fromCodePoint(word.text.codePointAt(0)!);
  const whole = reader.names.find(word.text);
  const { segments, offsets } = readRun(reader.source, word, letter.length);
  const isRun =
    word.kind === "word" && !word.group && segments.length > 0 && offsets.at(-1) === word.end - word.start;
  const isWhole = whole !== null || !isRun || (reader.names.find(letter) === null && isVariable(letter));
  const name = isWhole ? word.text : letter;
  const relation = resolveRelation(reader, word, name);
  return headOf(reader, word, name, relation, isWhole ? [] : segments.map(({ text }) => text));
}

function headOf(
  reader: Reader,
  { from, to }: Place,
  name: string,
  relation: RelationSymbol | null,
  variables: readonly string[],
): Head {
  const place = { from, to };
  const mistakes = reader.diagnostics.length;
  const twice = variables.find((variable, index) => variables.indexOf(variable) < index);
  if (twice !== undefined)
    reader.report(
      "variable-twice",
      place,
      `${quote(twice)} is two of the variables that ${quote(name)} is defined with`,
      "give one of them another name, and say in the formula that they are equal",
    );
  if (relation !== null && variables.length !== relation.places)
    reader.report(
      "places-differ",
      place,
      `${quote(name)} has ${countOf(relation.places, "place")}, and ${countOf(variables.length, "variable")} ${variables.length === 1 ? "is" : "are"} given`,
      `write \`${callForm(name, relation.places)} iff …\``,
    );
  const isSound = reader.diagnostics.length === mistakes && variables.length > 0;
  const text = callForm(name, variables.length, variables);
  return { ...place, name, relation, variables: isSound ? variables : null, text };
}

/**
 * The relation of that name.
 * @returns null after a report, and for a damaged name
 */
export function resolveRelation(reader: Reader, place: Token, name: string): RelationSymbol | null {
  const named = reader.names.find(name);
  if (named?.kind === "relation") return named.relation;
  if (named?.kind === "damaged") return null;
  if (named !== null) {
    reader.report(
      "wrong-kind",
      place,
      `${quote(name)} is ${kindText(named.kind)}, where a relation is expected`,
    );
    return null;
  }
  const near = reader.names.nearest(name, ["relation"]);
  reader.report(
    "unknown-name",
    place,
    `there is no relation ${quote(name)}`,
    near !== null
      ? `write \`${near}\``
      : `declare it: \`relation ${name}${place.kind === "relation-sign" ? " infix" : ""}\``,
  );
  return null;
}

// What the carrier makes of it

/** The carrier with the bounds that the atoms need; reports the atoms that say nothing on it, or need too large a bound. */
function fitToAtoms(
  reader: Reader,
  description: CarrierDescription,
  atoms: readonly PlacedAtom[],
): CarrierDescription {
  const within = atoms.filter(({ atom, place }) => {
    const bound = largestBound(fitCarrier(description, [atom]));
    if (bound <= LARGEST_OFFSET) return true;
    reader.report(
      "size-too-large",
      place,
      `this tells differences or positions up to ${bound} apart; the most is ${LARGEST_OFFSET}`,
      "take smaller numbers",
    );
    return false;
  });
  const fitted = fitCarrier(
    description,
    within.map(({ atom }) => atom),
  );
  const vocabulary = vocabularyOf(buildCarrier(fitted));
  for (const { atom, place } of within) {
    const complaint = vocabulary.complaint(atom);
    if (complaint !== null)
      reader.report(
        "not-on-carrier",
        place,
        complaint.message,
        complaint.suggestion === null ? null : `take ${complaint.suggestion}`,
      );
  }
  return fitted;
}

function checkTables(
  reader: Reader,
  description: CarrierDescription,
  relations: readonly DefinedRelation[],
  places: readonly Place[],
): void {
  const carrier = buildCarrier(description);
  let entries = 0;
  let values = 0;
  relations.forEach(({ relation, formula }, index) => {
    const kinds = countKinds(carrier, relation.places);
    entries += kinds;
    if (entries <= LARGEST_TABLES) {
      values += kinds * atomsOf(formula).length;
      if (values > MOST_VALUES) {
        reader.report(
          "size-too-large",
          places[index]!,
          `the formula of ${quote(relation.name)} is too long for the ${kinds} kinds of tuples that it would have to be decided for`,
          "write a shorter one",
        );
        values = 0;
      }
      return;
    }
    reader.report(
      "size-too-large",
      places[index]!,
      `there are ${kinds === Infinity ? "too many" : kinds} kinds of tuples that ${quote(relation.name)} would have to be decided for; all relations together may have ${LARGEST_TABLES}`,
      "take smaller numbers, fewer components, or a relation of fewer places",
    );
    entries = 0;
  });
}
