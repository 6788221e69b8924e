/**
 * What definitions on a carrier say of its elements: `x < y and colour(x) = 1`, `x.a < y.b`, `parent(y) = x`. Formulas
 * without quantifiers, in the carrier's own words; relations of the user's do not occur.
 */
import { allOf, anyOf, notOf } from "../logic/carrier-formulas.ts";
import type {
  CarrierAtom,
  CarrierDescription,
  CarrierFormula,
  ElementTerm,
} from "../logic/structure-definition.ts";
import { type CarrierReading, resolveStep, withParts } from "./carriers.ts";
import { ConnectiveReader, type Connectives } from "./connectives.ts";
import type { Place } from "./diagnostics.ts";
import { listWords } from "./help.ts";
import type { Token } from "./lexer.ts";
import { isKeptWord, isVariable } from "./names.ts";
import { nearestName } from "./nearest.ts";
import { hintFor, quote, type Reader, Unreadable } from "./reader.ts";
import { countOf, kindText } from "./wording.ts";

/** An atom of a definition, and where it stands. */
export interface PlacedAtom {
  readonly atom: CarrierAtom;
  readonly place: Place;
}

/** The relation that a definition is of, and its variables. */
export interface DefinitionHead {
  /** As written: `R(x, y)`. */
  readonly text: string;
  /** Null when they are not told: then none is reported as free. */
  readonly variables: readonly string[] | null;
}

type Compared = "=" | "<" | "≤";
/** A comparison as it is kept: `x > y` is y < x, `x ≠ y` the negation of x = y. */
interface Comparison {
  readonly relation: Compared;
  readonly turned: boolean;
  readonly negated: boolean;
}

const COMPARISONS: ReadonlyMap<string, Comparison> = new Map([
  ["=", { relation: "=", turned: false, negated: false }],
  ["≠", { relation: "=", turned: false, negated: true }],
  ["<", { relation: "<", turned: false, negated: false }],
  [">", { relation: "<", turned: true, negated: false }],
  ["≤", { relation: "≤", turned: false, negated: false }],
  ["<=", { relation: "≤", turned: false, negated: false }],
  ["≥", { relation: "≤", turned: true, negated: false }],
  [">=", { relation: "≤", turned: true, negated: false }],
]);
const COMPARISON_LIST = "`=`, `≠`, `<`, `≤`, `>` or `≥`";

type LabelName = (CarrierAtom & { kind: "label" })["name"];
const LABELS: ReadonlySet<string> = new Set<LabelName>(["colour", "copy", "part"]);
/** How many elements each relation of a carrier is said of, and how many terms each operation is applied to. */
const HOLDS: ReadonlyMap<string, number> = new Map([
  ["adjacent", 2],
  ["arc", 2],
  ["beats", 2],
]);
const OPERATIONS: ReadonlyMap<string, number> = new Map([
  ["meet", 2],
  ["join", 2],
  ["co", 1],
  ["parent", 1],
]);
/** Words that are applied to elements. */
const CALLED: readonly string[] = [...LABELS, ...HOLDS.keys(), ...OPERATIONS.keys()];

/** Numbers beyond which no offset reaches. */
const LARGEST_NUMBER = 1_000_000;

const connectives: Connectives<CarrierFormula> = {
  true: { kind: "true" },
  false: { kind: "false" },
  not: notOf,
  and: allOf,
  or: anyOf,
  implies: (left, right) => ({ kind: "implies", left, right }),
  iff: (left, right) => ({ kind: "iff", left, right }),
};

/** Reads the formulas of the definitions on one carrier. */
export class CarrierFormulaReader extends ConnectiveReader<CarrierFormula> {
  /** All atoms that have been read without a mistake. */
  readonly atoms: PlacedAtom[] = [];
  readonly #carrier: CarrierReading | null;
  readonly #isEnd: () => boolean;
  #head: DefinitionHead = { text: "", variables: [] };
  /** Steps that were read together with an element, as the lexer takes `x-1` for one word. */
  #steps = 0;

  /**
   * @param carrier null when a mistake hides it: then components are not looked up
   * @param isEnd whether the `and` that comes next begins the definition of another relation
   */
  constructor(reader: Reader, carrier: CarrierReading | null, isEnd: () => boolean) {
    super(reader, connectives);
    this.#carrier = carrier;
    this.#isEnd = isEnd;
  }

  /** Reads the formula of a definition. Throws {@link Unreadable} when it is left in the middle. */
  read(head: DefinitionHead): CarrierFormula {
    const { reader } = this;
    const { level } = reader;
    const first = reader.peek();
    const before = this.atoms.length;
    this.#head = head;
    const formula = this.biconditional();
    reader.level = level;
    reader.charge(this.atoms.length - before, { from: first.from, to: reader.last.to });
    return formula;
  }

  protected override endsBefore(): boolean {
    return this.#isEnd();
  }

  protected override atom(token: Token): CarrierFormula {
    const { reader } = this;
    if (token.kind === "forall" || token.kind === "exists")
      return reader.failExpected(
        "a formula without quantifiers",
        "a definition says of elements what the carrier tells of them",
      );
    const isCalled = reader.peekAfter(1).kind === "open";
    if (token.kind === "word" && isCalled && LABELS.has(token.text)) return this.#labelled(token);
    if (token.kind === "word" && isCalled && HOLDS.has(token.text)) return this.#holding(token);
    if (this.#isForeign(token)) return this.#refuse(token);
    return this.#compared(token);
  }

  // Relations of the user's, and what else is no word of carriers

  #isForeign(token: Token): boolean {
    if (token.kind === "relation-sign") return true;
    if (token.kind !== "word" || OPERATIONS.has(token.text)) return false;
    return !isVariable(stepsInside(token.text)?.name ?? token.text);
  }

  /** Reports an atom of one of the user's relations, or of an unknown one, and passes over it. */
  #refuse(token: Token): CarrierFormula {
    const { reader } = this;
    const letter = String.fromCodePoint(token.text.codePointAt(0)!);
    const named = reader.names.find(token.text) ?? (token.kind === "word" ? reader.names.find(letter) : null);
    const own = `carriers have ${listWords([COMPARISON_LIST, ...CALLED.map(quote)])}`;
    if (named === null && (token.kind === "relation-sign" || isKeptWord(token.text)))
      return reader.failExpected("a formula about elements of the carrier", own);
    if (named === null) {
      const near = nearestName(token.text, CALLED);
      reader.report(
        "unknown-name",
        token,
        `${quote(token.text)} is nothing that a carrier tells of its elements`,
        near !== null ? `write \`${near}\`` : own,
      );
    } else if (named.kind !== "damaged")
      reader.report(
        "wrong-kind",
        token,
        `${quote(token.text)} speaks of ${kindText(named.kind)}, where only what the carrier itself tells of its elements can stand`,
        own,
      );
    const mark = reader.mark;
    reader.next();
    if (reader.at("open")) {
      reader.next();
      if (!reader.skipGroup(mark)) throw new Unreadable(false);
    } else if (reader.accept("dot") !== null && reader.at("word")) reader.next();
    // `color(x) = 1`: what it is compared with goes with it.
    if (comparisonOf(reader.peek()) !== null) {
      reader.next();
      this.#term();
    }
    return connectives.true;
  }

  /** Takes down an atom, unless a mistake has been reported in it. */
  #note(atom: CarrierAtom, place: Place, mistakes: number): void {
    if (this.reader.diagnostics.length === mistakes) this.atoms.push({ atom, place });
  }

  // Comparisons

  #compared(first: Token): CarrierFormula {
    const { reader } = this;
    const mistakes = reader.diagnostics.length;
    const left = this.#term();
    const sign = reader.peek();
    const comparison = comparisonOf(sign);
    if (comparison === null) return this.#failComparison(sign);
    reader.next();
    reader.crossLine();
    const right = this.#term();
    const place = { from: first.from, to: reader.last.to };
    const next = reader.peek();
    if (comparisonOf(next) !== null) {
      const text = reader.excerpt(first, reader.last);
      const middle = text.slice(text.lastIndexOf(sign.text) + sign.text.length).trim();
      reader.fail(
        "chained",
        next,
        `one comparison cannot follow another: ${quote(next.text)} after ${quote(text)}`,
        `write \`${text} ∧ ${middle} ${next.text} …\``,
      );
    }
    const { relation, turned, negated } = comparison;
    const atom: CarrierAtom = {
      kind: "compare",
      relation,
      left: turned ? right : left,
      right: turned ? left : right,
    };
    this.#note(atom, place, mistakes);
    return negated ? notOf(atom) : atom;
  }

  #failComparison(sign: Token): never {
    const { reader } = this;
    const last = reader.last;
    const hint =
      sign.kind === "relation-sign" && reader.names.find(sign.text) === null ? hintFor(sign) : null;
    const isRelation =
      (sign.kind === "relation-sign" || sign.kind === "word") &&
      reader.names.find(sign.text)?.kind === "relation";
    if (isRelation)
      reader.fail(
        "wrong-kind",
        sign,
        `${quote(sign.text)} is a relation, where only what the carrier itself tells of its elements can stand`,
        `elements are compared by ${COMPARISON_LIST}`,
      );
    if (sign.kind === "relation-sign")
      reader.fail(
        "unexpected",
        sign,
        `expected ${COMPARISON_LIST}, found ${quote(sign.text)}`,
        hint?.startsWith("write") ? hint : null,
      );
    return reader.failExpected(`${COMPARISON_LIST} after ${quote(last.text)}`);
  }

  // Labels

  /** `colour(x) = 1`, `part(x) < part(y)`: unfolded to atoms that each name one colour, copy or part. */
  #labelled(first: Token): CarrierFormula {
    const { reader } = this;
    const mistakes = reader.diagnostics.length;
    const left = this.#label();
    const sign = reader.peek();
    const comparison = comparisonOf(sign);
    if (comparison === null) return this.#failComparison(sign);
    reader.next();
    reader.crossLine();
    const { relation, turned, negated } = comparison;
    const holds = (one: number, other: number) => {
      const [lesser, greater] = turned ? [other, one] : [one, other];
      return relation === "=" ? one === other : relation === "<" ? lesser < greater : lesser <= greater;
    };
    const token = reader.peek();
    const isLabel = token.kind === "word" && LABELS.has(token.text) && reader.peekAfter(1).kind === "open";
    const right = isLabel ? this.#label() : this.#number("the number of a colour, copy or part");
    const place = { from: first.from, to: reader.last.to };
    const said = (label: Label, value: number): CarrierAtom => {
      const atom: CarrierAtom = { kind: "label", name: label.name, of: label.of, value };
      this.#note(atom, place, mistakes);
      return atom;
    };
    if (typeof right === "number") {
      // A number that is not there is said as it stands, for the complaint.
      const isThere = relation !== "=" && right >= 1 && right <= left.values;
      const parts = isThere
        ? upTo(left.values)
            .filter((value) => holds(value, right))
            .map((value) => said(left, value))
        : [said(left, right)];
      return negated ? notOf(anyOf(parts)) : anyOf(parts);
    }
    reader.charge(left.values * right.values, place);
    const lefts = upTo(Math.max(1, left.values)).map((value) => said(left, value));
    const rights = upTo(Math.max(1, right.values)).map((value) => said(right, value));
    const pairs = lefts.flatMap((one, index) =>
      rights.filter((_, other) => holds(index + 1, other + 1)).map((other) => allOf([one, other])),
    );
    return negated ? notOf(anyOf(pairs)) : anyOf(pairs);
  }

  #label(): Label {
    const { reader } = this;
    const name = reader.next().text as LabelName;
    const open = reader.next();
    const { term, carriers } = reader.withLines(false, () => {
      const token = reader.peek();
      if (token.kind !== "word" || !isVariable(token.text))
        reader.failExpected(`a variable after ${quote(`${name}(`)}`, `write \`${name}(x)\``);
      const read = this.#element();
      if (this.#steps !== 0) reader.failExpected("`)` after the variable");
      reader.close(open, "`)`");
      return read;
    });
    return { name, of: term, values: countValues(name, carriers) };
  }

  /** `adjacent(x, y)`. */
  #holding(word: Token): CarrierFormula {
    const mistakes = this.reader.diagnostics.length;
    this.reader.next();
    const args = this.#arguments(word, HOLDS.get(word.text)!);
    const atom: CarrierAtom = { kind: "holds", name: word.text as "arc", args };
    this.#note(atom, { from: word.from, to: this.reader.last.to }, mistakes);
    return atom;
  }

  // Terms

  #term(): ElementTerm {
    const { reader } = this;
    this.#steps = 0;
    const factor = this.#factor();
    let term = shifted(factor, this.#steps);
    this.#steps = 0;
    while (reader.at("plus") || reader.at("minus")) {
      const sign = reader.next();
      const steps = this.#number("how many steps");
      term = shifted(term, sign.kind === "plus" ? steps : -steps);
    }
    return term;
  }

  #factor(): ElementTerm {
    const { reader } = this;
    const token = reader.peek();
    if (token.kind === "number" || token.kind === "minus")
      return { kind: "number", value: this.#number("a number of the line") };
    const isOperation =
      (token.kind === "complement" || (token.kind === "word" && OPERATIONS.has(token.text))) &&
      reader.peekAfter(1).kind === "open";
    if (isOperation) {
      reader.next();
      const name = token.kind === "complement" ? "co" : (token.text as "meet");
      reader.enter(token);
      const args = this.#arguments(token, OPERATIONS.get(name)!);
      reader.level -= 1;
      return { kind: "apply", name, args };
    }
    if (token.kind === "word" && isVariable(stepsInside(token.text)?.name ?? token.text))
      return this.#element().term;
    return reader.failExpected("an element: a variable, a number or an operation", operationHint(token));
  }

  /** Reads a variable with its path, and the carriers that it leads to. */
  #element(): { readonly term: ElementTerm; readonly carriers: readonly CarrierDescription[] } {
    const { reader } = this;
    const word = reader.next();
    const inside = stepsInside(word.text);
    const variable = inside?.name ?? word.text;
    this.#steps = inside?.steps ?? 0;
    const { text, variables } = this.#head;
    if (variables !== null && !variables.includes(variable))
      reader.report(
        "free-variables",
        word,
        `${quote(variable)} is free in the definition of ${quote(text)}`,
        `its variables are ${listWords(variables.map(quote))}`,
      );
    let carriers: readonly CarrierDescription[] = this.#carrier === null ? [] : [this.#carrier.description];
    const path: (number | "outer" | "inner")[] = [];
    while (this.#steps === 0 && reader.accept("dot") !== null) {
      const token = reader.peek();
      if (token.kind !== "word" && token.kind !== "number")
        reader.failExpected(`a component of ${quote(variable)} after \`.\``);
      reader.next();
      const names = this.#isCoordinate(token.text) ? null : stepsInside(token.text);
      this.#steps = names?.steps ?? 0;
      // `x.1.2`: the lexer takes 1.2 for a number.
      for (const part of (names?.name ?? token.text).split(".")) {
        if (this.#carrier === null) continue;
        const step = resolveStep(reader, part, token, withParts(carriers), this.#carrier.coordinates);
        carriers = step?.carriers ?? [];
        if (step !== null) path.push(step.step);
        else {
          while (reader.accept("dot") !== null) reader.next();
          return { term: { kind: "element", variable, path }, carriers };
        }
      }
    }
    return { term: { kind: "element", variable, path }, carriers };
  }

  #isCoordinate(name: string): boolean {
    return [...(this.#carrier?.coordinates.values() ?? [])].some((names) => names.has(name));
  }

  #arguments(name: Token, count: number): readonly ElementTerm[] {
    const { reader } = this;
    const open = reader.next();
    const args = reader.withLines(false, () => {
      const found = [this.#term()];
      while (reader.accept("comma") !== null) found.push(this.#term());
      reader.close(open, "`,` or `)`");
      return found;
    });
    if (args.length !== count)
      reader.report(
        "places-differ",
        { from: name.from, to: reader.last.to },
        `${quote(name.text)} is said of ${countOf(count, "element")}, and ${args.length} ${args.length === 1 ? "is" : "are"} given`,
        `write \`${name.text}(${["x", "y"].slice(0, count).join(", ")})\``,
      );
    return args;
  }

  /** Reads a whole number, which may be 0 or negative. */
  #number(what: string): number {
    const { reader } = this;
    const first = reader.peek();
    const minus = reader.accept("minus");
    const token = reader.peek();
    if (token.kind !== "number") reader.failExpected(`a whole number (${what})`);
    reader.next();
    const place = { from: first.from, to: token.to };
    if (!/^[0-9]+$/.test(token.text))
      reader.fail("not-whole", place, `${quote(token.text)} is not a whole number (${what})`);
    const value = Number(token.text);
    if (value > LARGEST_NUMBER)
      reader.fail(
        "size-too-large",
        place,
        `${quote(token.text)} is larger than ${LARGEST_NUMBER}, the most that is taken here (${what})`,
      );
    return minus === null || value === 0 ? value : -value;
  }
}

interface Label {
  readonly name: LabelName;
  readonly of: ElementTerm;
  /** How many there are; 0 where the carrier has none. */
  readonly values: number;
}

/** How many colours, copies or parts there are for elements of these carriers; 0 where they have none. */
function countValues(name: LabelName, carriers: readonly CarrierDescription[]): number {
  const parts = withParts(carriers);
  if (name === "part") return carriers.some(({ kind }) => kind === "sum") ? parts.length : 0;
  return Math.max(
    0,
    ...parts.map((carrier) => {
      if (carrier.kind === "dense-line" && name === "colour") return carrier.colours;
      return carrier.kind === "tuples" && name === "copy" ? carrier.widths.length : 0;
    }),
  );
}

/** The name and the steps in a word such as `x-1`; null for others. */
function stepsInside(word: string): { readonly name: string; readonly steps: number } | null {
  const match = /^(.+)-([0-9]{1,7})$/.exec(word);
  return match === null || match[2] === "0" ? null : { name: match[1]!, steps: -Number(match[2]) };
}

function operationHint(token: Token): string | null {
  if (token.kind !== "word") return null;
  const near = nearestName(token.text, [...OPERATIONS.keys()]);
  return near === null
    ? "variables are single lower-case letters with digits or primes"
    : `write \`${near}\``;
}

function upTo(last: number): readonly number[] {
  return Array.from({ length: last }, (_, index) => index + 1);
}

function comparisonOf({ kind, text }: Token): Comparison | null {
  if (kind === "equal") return COMPARISONS.get("=")!;
  if (kind === "not-equal") return COMPARISONS.get("≠")!;
  return kind === "relation-sign" ? (COMPARISONS.get(text) ?? null) : null;
}

/** The term so many steps further on; steps are added up. */
export function shifted(term: ElementTerm, by: number): ElementTerm {
  if (term.kind === "number") return { kind: "number", value: term.value + by };
  const [of, sum] = term.kind === "shift" ? [term.of, term.by + by] : [term, by];
  return sum === 0 ? of : { kind: "shift", of, by: sum };
}
