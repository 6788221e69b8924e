/** Formulas: the part of the parser that reads them, resolving names and unfolding definitions. */
import {
  and,
  type Formula,
  iff,
  implies,
  not,
  or,
  quantify,
  type RelationSymbol,
  type Variable,
  verum,
} from "../logic/formula.ts";
import { AtomReader } from "./atoms.ts";
import type { Place } from "./diagnostics.ts";
import { listWords } from "./help.ts";
import { joined } from "./join.ts";
import type { Token } from "./lexer.ts";
import { measureFormula } from "./measure.ts";
import { readVariables } from "./quantifiers.ts";
import { MAX_NESTING, quote, type Reader, Unreadable } from "./reader.ts";
import { declaredIn, findSoleRelation, putRelation } from "./sole-relation.ts";
import { hintBetweenFormulas, isTermAhead } from "./terms.ts";
import { signOf } from "./tokens.ts";

export interface FormulaReading {
  readonly formula: Formula;
  /** Whether a mistake was reported inside; the formula is then a stand-in. */
  readonly damaged: boolean;
  /** Where each free variable occurs first. */
  readonly free: ReadonlyMap<Variable, Place>;
  /** The variables that some quantifier binds. */
  readonly bound: ReadonlySet<Variable>;
  /** The properties that were said of no relation: the formula has a stand-in for it, to be replaced. */
  readonly bare: readonly Token[];
  /** The source, on one line. */
  readonly text: string;
}

/** Reads a formula, which may have free variables. Throws {@link Unreadable} when it is left in the middle. */
export function readFormula(reader: Reader): FormulaReading {
  return new FormulaReader(reader).read();
}

/** A formula and its source on one line. */
export interface ReadFormula {
  readonly formula: Formula;
  readonly text: string;
}

/** A formula in which properties may still be said of no relation. */
export interface UnsettledFormula extends ReadFormula {
  readonly bare: readonly Token[];
}

export interface ClosedOptions {
  /** The variables that may be free. */
  readonly parameters?: readonly Variable[];
  /** What else than a quantifier would help, given the variables that are free. */
  readonly alternative?: (free: readonly Variable[]) => string;
  /** The relations of what the formula belongs to, for bare properties; null when a mistake hides them. */
  readonly about?: readonly RelationSymbol[] | null;
}

/**
 * Reads a formula whose free variables must be among the given ones, and reports others.
 * @param what the formula's part in the statement, for messages: "the axiom `mid`"
 * @returns null when a mistake was reported
 */
export function readClosed(reader: Reader, what: string, options: ClosedOptions = {}): ReadFormula | null {
  const reading = readUnsettled(reader, what, options);
  return reading === null ? null : settleFormula(reader, reading, options.about);
}

/** As {@link readClosed}, with bare properties left for the caller to settle. */
export function readUnsettled(
  reader: Reader,
  what: string,
  { parameters = [], alternative }: ClosedOptions = {},
): UnsettledFormula | null {
  const { formula, damaged, free, bound, bare, text } = readFormula(reader);
  const open = [...free.keys()].filter((variable) => !parameters.includes(variable));
  const first = open[0];
  if (first === undefined) return damaged ? null : { formula, text, bare };
  const names = listWords([...open].sort().map(quote));
  const prefix = `∀${[...open].sort().join(" ")}.`;
  const fits = [...text].length <= 100;
  // `∀x Rxy → Ryx`: the quantifier is there and does not reach so far.
  const isShort = open.some((variable) => bound.has(variable));
  const closed = isShort
    ? "a quantifier without a dot reaches no further than ¬: write a dot after its variables, or brackets"
    : fits
      ? `write \`${prefix} ${text}\``
      : `put \`${prefix}\` before it`;
  reader.report(
    "free-variables",
    free.get(first)!,
    `${names} ${open.length === 1 ? "is" : "are"} free in ${what}`,
    alternative === undefined ? closed : `${closed}, or ${alternative([...open].sort())}`,
  );
  return null;
}

/** Reads a formula that may have free variables; null when a mistake was reported. */
export function readOpen(reader: Reader): ReadFormula | null {
  const { formula, damaged, text, bare } = readFormula(reader);
  return damaged ? null : settleFormula(reader, { formula, text, bare }, []);
}

/**
 * Says bare properties of the sole relation.
 * @param about the relations of what the formula belongs to, beside its own; null when a mistake hides them
 * @returns null when that is not told, which has been reported
 */
export function settleFormula(
  reader: Reader,
  { formula, text, bare }: UnsettledFormula,
  about: readonly RelationSymbol[] | null = [],
): ReadFormula | null {
  if (bare.length === 0) return { formula, text };
  if (about === null) return null;
  const relation = findSoleRelation(reader, bare, [...about, ...declaredIn(formula)]);
  return relation === null ? null : { formula: putRelation(formula, relation), text };
}

class FormulaReader {
  readonly #reader: Reader;
  readonly #atoms: AtomReader;
  /** How many quantifiers around the place bind each variable. */
  readonly #bound = new Map<Variable, number>();
  readonly #free = new Map<Variable, Place>();
  /** Whether text was passed over, so that what is free cannot be told. */
  #skipped = false;

  constructor(reader: Reader) {
    this.#reader = reader;
    this.#atoms = new AtomReader(reader, (variable, place) => {
      if ((this.#bound.get(variable) ?? 0) > 0 || this.#free.has(variable)) return;
      this.#free.set(variable, place);
    });
  }

  read(): FormulaReading {
    const reader = this.#reader;
    const mistakes = reader.diagnostics.length;
    const level = reader.level;
    const first = reader.peek();
    const formula = this.#biconditional();
    reader.level = level;
    const place = { from: first.from, to: reader.last.to };
    const damaged = () => reader.diagnostics.length > mistakes;
    if (!damaged()) {
      const { parts, nesting } = measureFormula(formula);
      reader.charge(parts, place);
      if (nesting > MAX_NESTING) reader.failNested(place);
    }
    return {
      formula,
      damaged: damaged(),
      free: this.#skipped ? new Map() : this.#free,
      bound: new Set(this.#bound.keys()),
      bare: this.#atoms.bare,
      text: reader.excerpt(first, reader.last),
    };
  }

  // Connectives, from the loosest to the tightest

  #biconditional(): Formula {
    const left = this.#conditional();
    return this.#reader.at("iff")
      ? iff(
          left,
          this.#right(() => this.#biconditional()),
        )
      : left;
  }

  #conditional(): Formula {
    const left = this.#disjunction();
    return this.#reader.at("implies")
      ? implies(
          left,
          this.#right(() => this.#conditional()),
        )
      : left;
  }

  #right(read: () => Formula): Formula {
    const sign = this.#reader.next();
    this.#reader.crossLine();
    this.#reader.enter(sign);
    const formula = read();
    this.#reader.level -= 1;
    return formula;
  }

  #disjunction(): Formula {
    const first = this.#conjunction();
    if (!this.#reader.at("or")) return first;
    const parts = [first];
    while (this.#reader.accept("or") !== null) {
      this.#reader.crossLine();
      parts.push(this.#conjunction());
    }
    return joined(or, parts);
  }

  #conjunction(): Formula {
    const first = this.#operand();
    if (!this.#reader.at("and")) return first;
    const parts = [first];
    while (this.#reader.accept("and") !== null) {
      this.#reader.crossLine();
      parts.push(this.#operand());
    }
    return joined(and, parts);
  }

  #operand(): Formula {
    const formula = this.#unary();
    const hint = hintBetweenFormulas(this.#reader.peek());
    if (hint !== null) this.#reader.failExpected("an operator between formulas", hint);
    return formula;
  }

  #unary(): Formula {
    const reader = this.#reader;
    const token = reader.peek();
    if (isTermAhead(reader)) return this.#atoms.readTerm();
    switch (token.kind) {
      case "not": {
        reader.next();
        reader.crossLine();
        reader.enter(token);
        const body = this.#unary();
        reader.level -= 1;
        return not(body);
      }
      case "forall":
      case "exists":
        return this.#quantified(token.kind);
      case "true":
      case "false":
        reader.next();
        return { kind: token.kind };
      case "open":
        return this.#group();
      case "relation-sign":
        return this.#atoms.readSignFirst(token);
      case "word":
        return this.#atoms.readWord(token);
      case "open-brace":
        return reader.failExpected(
          "a formula",
          "a theory cannot stand where a formula is meant: use ( ) as brackets",
        );
      default:
        return reader.failExpected("a formula", this.#lineHint(token));
    }
  }

  #lineHint(token: Token): string | null {
    if (!["and", "or", "implies", "iff"].includes(token.kind) || !token.lineStart) return null;
    return `end the line before with \`${signOf(token.kind as "and").symbol}\`, or put the formula in brackets: then it goes on`;
  }

  #group(): Formula {
    const reader = this.#reader;
    const mark = reader.mark;
    const open = reader.next();
    reader.enter(open);
    const { level } = reader;
    return reader.withLines(false, () => {
      let formula: Formula;
      try {
        formula = this.#biconditional();
        this.#reader.close(open, "an operator or `)`");
      } catch (error) {
        if (!(error instanceof Unreadable) || error.beyondBrackets) throw error;
        this.#skipped = true;
        if (!reader.skipGroup(mark)) throw error;
        formula = verum;
      }
      reader.level = level - 1;
      return formula;
    });
  }

  // Quantifiers

  #quantified(kind: "forall" | "exists"): Formula {
    const reader = this.#reader;
    const sign = reader.next();
    reader.crossLine();
    const variables = readVariables(reader, sign);
    for (const { text } of variables) this.#bound.set(text, (this.#bound.get(text) ?? 0) + 1);
    for (const variable of variables) reader.enter(variable);
    const dotted = reader.accept("dot") !== null;
    reader.crossLine();
    const body = dotted ? this.#biconditional() : this.#unary();
    reader.level -= variables.length;
    for (const { text } of variables) this.#bound.set(text, this.#bound.get(text)! - 1);
    return quantify(
      kind,
      variables.map(({ text }) => text),
      body,
    );
  }
}
