/** Atoms and what is written like them: applications of defined formulas, sentences by name, axioms by label. */
import {
  atom,
  equal,
  type Formula,
  not,
  type RelationSymbol,
  substitute,
  type Variable,
  verum,
} from "../logic/formula.ts";
import { readArguments } from "./arguments.ts";
import type { Place } from "./diagnostics.ts";
import { readAxiomOf } from "./labels.ts";
import { readRun, type Token } from "./lexer.ts";
import { measureFormula } from "./measure.ts";
import { isKeptWord, isVariable, type Named } from "./names.ts";
import { isPropertyAhead, nearestProperty, readPropertySentence } from "./property-atoms.ts";
import { hintFor, quote, type Reader, Unreadable } from "./reader.ts";
import type { Definition } from "./statements.ts";
import { readTermFormula } from "./terms.ts";
import { callForm, countOf, kindText } from "./wording.ts";

export class AtomReader {
  readonly #reader: Reader;
  readonly #use: (variable: Variable, place: Place) => void;
  /** The properties that were said of no relation; the formulas have a stand-in for it. */
  readonly bare: Token[] = [];

  /** @param use told of every variable that occurs in an atom */
  constructor(reader: Reader, use: (variable: Variable, place: Place) => void) {
    this.#reader = reader;
    this.#use = use;
  }

  /** Reads a formula that begins with a relation term. */
  readTerm(): Formula {
    return readTermFormula(this.#reader, this.#use);
  }

  /** Reads an atom, or the sentence or application that a name stands for, beginning with a word. */
  readWord(word: Token): Formula {
    const { names } = this.#reader;
    const named = names.find(word.text);
    if (isPropertyAhead(this.#reader, word)) return readPropertySentence(this.#reader, this.bare);
    if (named !== null) return this.#name(word, named);
    if (isKeptWord(word.text)) return this.#reader.failExpected("a formula");
    if (isVariable(word.text)) return this.#infix(word);
    return this.#juxtaposed(word) ?? this.#unknown(word);
  }

  #name(word: Token, named: Named): Formula {
    const reader = this.#reader;
    switch (named.kind) {
      case "relation":
        reader.next();
        return this.#application(word, named.relation);
      case "formula":
        reader.next();
        return this.#unfolded(word, named.definition);
      case "theory": {
        reader.next();
        const axiom = readAxiomOf(reader, word, named.definition);
        if (axiom === null && reader.at("open")) this.#arguments(word);
        return axiom?.formula ?? verum;
      }
      case "structure":
        reader.next();
        reader.report("wrong-kind", word, `${quote(word.text)} is a structure, where a formula is expected`);
        if (reader.at("open")) this.#arguments(word);
        return verum;
      case "damaged":
        reader.next();
        if (reader.at("open")) this.#arguments(word);
        else if (reader.accept("dot") !== null && reader.at("word")) reader.next();
        return verum;
    }
  }

  /** An atom of a relation whose name has been read. */
  #application(name: Token, relation: RelationSymbol): Formula {
    const reader = this.#reader;
    const form = callForm(relation.name, relation.places);
    if (!reader.at("open")) {
      reader.report(
        "places-differ",
        name,
        `${quote(relation.name)} has ${countOf(relation.places, "place")}, and no arguments follow it`,
        `write \`${form}\``,
      );
      // `R x y`: the letters are the arguments, set apart.
      if (reader.at("word") && isVariable(reader.peek().text)) throw new Unreadable(false);
      return verum;
    }
    const args = this.#arguments(name);
    if (args === null) return verum;
    if (args.length === relation.places) return atom(relation, ...args);
    this.#reportPlaces({ from: name.from, to: reader.last.to }, relation, args.length);
    return verum;
  }

  #reportPlaces(place: Place, relation: RelationSymbol, given: number): void {
    this.#reader.report(
      "places-differ",
      place,
      `${quote(relation.name)} has ${countOf(relation.places, "place")}, and ${countOf(given, "argument")} ${given === 1 ? "is" : "are"} given`,
      `write \`${callForm(relation.name, relation.places)}\``,
    );
  }

  #unfolded(name: Token, definition: Definition & { kind: "formula" }): Formula {
    const reader = this.#reader;
    const { parameters, body } = definition;
    const isCalled = reader.at("open") && reader.peek().from === name.to;
    if (parameters.length === 0 && !isCalled) {
      reader.charge(measureFormula(body).parts, name);
      return body;
    }
    const args = reader.at("open") ? this.#arguments(name) : [];
    if (args === null) return verum;
    if (args.length !== parameters.length || parameters.length === 0) {
      const has =
        parameters.length === 0 ? "is a sentence" : `has ${countOf(parameters.length, "parameter")}`;
      reader.report(
        "places-differ",
        { from: name.from, to: reader.last.to },
        `${quote(definition.name)} ${has}, and ${countOf(args.length, "argument")} ${args.length === 1 ? "is" : "are"} given`,
        `write \`${callForm(definition.name, parameters.length, parameters)}\``,
      );
      return verum;
    }
    reader.charge(measureFormula(body).parts, name);
    return substitute(body, new Map(parameters.map((parameter, index) => [parameter, args[index]!])));
  }

  /** Reads `(x, y, …)`; null when an argument is no variable, which has been reported. */
  #arguments(name: Token): readonly Variable[] | null {
    return readArguments(this.#reader, name.text, this.#use);
  }

  /** `Rxy`: a relation with a one-letter name and as many variables as it has places. */
  #juxtaposed(word: Token): Formula | null {
    const reader = this.#reader;
    if (word.group) return null;
    const letter = String.fromCodePoint(word.text.codePointAt(0)!);
    const named = reader.names.find(letter);
    const { segments, offsets } = readRun(reader.source, word, letter.length);
    if (segments.length === 0 || offsets.at(-1) !== word.end - word.start) return null;
    if (named?.kind !== "relation" && named?.kind !== "damaged") {
      if (/^\p{Ll}/u.test(letter) || named !== null || segments.length > 3) return null;
      if (reader.names.nearest(word.text, ["relation", "formula", "theory"]) !== null) return null;
      for (const segment of segments) this.#use(segment.text, segment);
      this.#reportUnknownRelation(word, letter, segments.length, word.text);
      reader.next();
      return verum;
    }
    reader.next();
    for (const segment of segments) this.#use(segment.text, segment);
    if (named.kind === "damaged") return verum;
    if (segments.length === named.relation.places)
      return atom(named.relation, ...segments.map(({ text }) => text));
    this.#reportPlaces(word, named.relation, segments.length);
    return verum;
  }

  /**
   * @param given with how many arguments it is used
   * @param definition what the text may also be meant for: the name of a definition
   */
  #reportUnknownRelation(place: Place, name: string, given: number, definition?: string): void {
    const { names } = this.#reader;
    const near = names.nearest(name, ["relation", "formula"]);
    const declaration = given === 2 ? `relation ${name}` : `relation ${name} of ${countOf(given, "place")}`;
    if (name === "R" && names.isDeclared)
      this.#reader.report(
        "unknown-name",
        place,
        "there is no relation `R`: it is there without a declaration only while no other relation is declared",
        `declare it too: \`${declaration}\``,
      );
    else
      this.#reader.report(
        "unknown-name",
        place,
        definition === undefined
          ? `there is no relation or formula ${quote(name)}`
          : `there is no relation ${quote(name)}, and no definition ${quote(definition)}`,
        near !== null ? `write \`${near}\`` : `declare it: \`${declaration}\``,
      );
  }

  #unknown(word: Token): Formula {
    const reader = this.#reader;
    if (reader.peekAfter(1).kind === "open" && reader.peekAfter(1).from === word.to) {
      const property = nearestProperty(word.text);
      if (property !== null && reader.names.nearest(word.text, ["relation", "formula"]) === null)
        return this.#misspelledProperty(word, property);
      this.#reportUnknownRelation(word, word.text, this.#argumentsAhead());
      reader.next();
      this.#arguments(word);
      return verum;
    }
    const letter = String.fromCodePoint(word.text.codePointAt(0)!);
    const isRun = readRun(reader.source, word, 0).offsets.at(-1) === word.end - word.start;
    const near =
      reader.names.nearest(word.text, ["relation", "formula", "theory"]) ?? nearestProperty(word.text);
    const suggestion =
      near !== null
        ? `write \`${near}\``
        : isRun
          ? "variables are single lower-case letters with digits or primes"
          : reader.names.find(letter)?.kind === "relation"
            ? `after ${quote(letter)}, write its arguments: \`${callForm(letter, this.#placesOf(letter))}\``
            : null;
    reader.next();
    reader.report(
      "unknown-name",
      word,
      `there is no relation, formula or theory ${quote(word.text)}`,
      suggestion,
    );
    if (reader.accept("dot") !== null && reader.at("word")) reader.next();
    return verum;
  }

  #misspelledProperty(word: Token, property: string): Formula {
    const reader = this.#reader;
    reader.next();
    reader.report(
      "unknown-name",
      word,
      `there is no relation, formula or property ${quote(word.text)}`,
      `write \`${property}\``,
    );
    const mark = reader.mark;
    reader.next();
    if (!reader.skipGroup(mark)) throw new Unreadable(false);
    return verum;
  }

  /** How many arguments stand in the brackets after the next token, as far as commas tell. */
  #argumentsAhead(): number {
    let count = 1;
    for (let ahead = 2; ahead < 40; ahead += 1) {
      const { kind } = this.#reader.peekAfter(ahead);
      if (kind === "comma") count += 1;
      else if (kind !== "word") break;
    }
    return count;
  }

  #placesOf(name: string): number {
    const named = this.#reader.names.find(name);
    return named?.kind === "relation" ? named.relation.places : 2;
  }

  /** `≺(x, y)`: an infix relation written before its arguments. */
  readSignFirst(sign: Token): Formula {
    const reader = this.#reader;
    const named = reader.names.find(sign.text);
    if (named === null && reader.peekAfter(1).kind !== "open") return reader.failExpected("a formula");
    reader.next();
    if (named?.kind === "relation") return this.#application(sign, named.relation);
    if (named === null) {
      reader.report(
        "unknown-name",
        sign,
        `there is no relation ${quote(sign.text)}`,
        `declare it: \`relation ${sign.text} infix\``,
      );
    }
    if (reader.at("open")) this.#arguments(sign);
    return verum;
  }

  /** An atom that begins with a variable: `x = y`, `x ≠ y`, `x ≺ y`. */
  #infix(variable: Token): Formula {
    const reader = this.#reader;
    reader.next();
    const sign = reader.peek();
    if (sign.kind === "open" && sign.from === variable.to) return this.#variableCall(variable);
    if (!this.#isComparison(sign))
      return reader.failExpected(
        `\`=\`, \`≠\` or an infix relation after the variable ${quote(variable.text)}`,
      );
    this.#use(variable.text, variable);
    const formula = this.#comparison(variable);
    const chained = reader.peek();
    if (!this.#isComparison(chained) || (chained.kind === "relation-sign" && !reader.names.has(chained.text)))
      return formula;
    const middle = reader.last.text;
    reader.report(
      "chained",
      chained,
      `one comparison cannot follow another: ${quote(chained.text)} after ${quote(`${variable.text} ${sign.text} ${middle}`)}`,
      `write \`${variable.text} ${sign.text} ${middle} ∧ ${middle} ${chained.text} …\``,
    );
    while (this.#isComparison(reader.peek())) this.#comparison(reader.last);
    return verum;
  }

  /** `r(x, y)`, with a variable where the name of a relation is meant. */
  #variableCall(variable: Token): Formula {
    const { names } = this.#reader;
    const near = names.nearest(variable.text, ["relation", "formula"]);
    this.#reader.report(
      "unknown-name",
      variable,
      `${quote(variable.text)} is a variable, and no relation or formula`,
      near !== null
        ? `write \`${near}\``
        : "the name of a relation begins with a capital letter or has several letters",
    );
    this.#arguments(variable);
    return verum;
  }

  #isComparison(token: Token): boolean {
    if (token.kind === "equal" || token.kind === "not-equal" || token.kind === "relation-sign") return true;
    if (token.kind !== "word" || isVariable(token.text) || isKeptWord(token.text)) return false;
    if (this.#reader.names.isInfix(token.text)) return true;
    // `x R y` and `x befor y`: taken for what they are meant to be, and reported.
    const right = this.#reader.peekAfter(1);
    return right.kind === "word" && isVariable(right.text) && !right.lineStart;
  }

  /** Reads the sign and the variable on its right. */
  #comparison(left: Token): Formula {
    const reader = this.#reader;
    const sign = reader.next();
    reader.crossLine();
    const right = reader.peek();
    let relation: RelationSymbol | null = null;
    if (sign.kind === "word" || sign.kind === "relation-sign")
      relation = this.#infixRelation(sign, left, right);
    if (right.kind !== "word" || !isVariable(right.text))
      return reader.failExpected(`a variable after ${quote(sign.text)}`);
    reader.next();
    this.#use(right.text, right);
    if (sign.kind === "equal") return equal(left.text, right.text);
    if (sign.kind === "not-equal") return not(equal(left.text, right.text));
    return relation === null ? verum : atom(relation, left.text, right.text);
  }

  /** The relation that a word or symbol between two variables names; null after a report. */
  #infixRelation(sign: Token, left: Token, right: Token): RelationSymbol | null {
    const reader = this.#reader;
    const named = reader.names.find(sign.text);
    if (named?.kind === "relation" && named.relation.infix) return named.relation;
    if (named?.kind === "damaged") return null;
    const second = right.kind === "word" && isVariable(right.text) ? right.text : "y";
    if (named?.kind === "relation")
      reader.report(
        "not-infix",
        sign,
        `${quote(sign.text)} was not declared to stand between its arguments`,
        named.relation.places === 2
          ? `write \`${sign.text}(${left.text},${second})\`, or declare \`relation ${sign.text} infix\``
          : `write \`${callForm(sign.text, named.relation.places)}\``,
      );
    else if (named !== null)
      reader.report(
        "wrong-kind",
        sign,
        `${quote(sign.text)} is ${kindText(named.kind)}, where an infix relation is expected`,
      );
    else if (sign.kind === "relation-sign" && !reader.names.has(sign.text)) {
      reader.report("unknown-name", sign, `there is no relation ${quote(sign.text)}`, hintFor(sign));
    } else {
      const near = reader.names.nearest(sign.text, ["relation"]);
      reader.report(
        "unknown-name",
        sign,
        `there is no infix relation ${quote(sign.text)}`,
        near !== null ? `write \`${near}\`` : `declare it: \`relation ${sign.text} infix\``,
      );
    }
    return null;
  }
}
