/** Formulas: the part of the parser that reads them, resolving names and unfolding definitions. */
import {
  and,
  type Formula,
  falsum,
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
import { ConnectiveReader, type Connectives } from "./connectives.ts";
import type { Place } from "./diagnostics.ts";
import { listWords } from "./help.ts";
import { joined } from "./join.ts";
import type { Token } from "./lexer.ts";
import { measureFormula } from "./measure.ts";
import { readVariables } from "./quantifiers.ts";
import { MAX_NESTING, quote, type Reader } from "./reader.ts";
import { declaredIn, findSoleRelation, putRelation } from "./sole-relation.ts";
import { hintBetweenFormulas, isTermAhead } from "./terms.ts";

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

const connectives: Connectives<Formula> = {
  true: verum,
  false: falsum,
  not,
  and: (parts) => joined(and, parts),
  or: (parts) => joined(or, parts),
  implies,
  iff,
};

class FormulaReader extends ConnectiveReader<Formula> {
  readonly #atoms: AtomReader;
  /** How many quantifiers around the place bind each variable. */
  readonly #bound = new Map<Variable, number>();
  readonly #free = new Map<Variable, Place>();

  constructor(reader: Reader) {
    super(reader, connectives);
    this.#atoms = new AtomReader(reader, (variable, place) => {
      if ((this.#bound.get(variable) ?? 0) > 0 || this.#free.has(variable)) return;
      this.#free.set(variable, place);
    });
  }

  read(): FormulaReading {
    const reader = this.reader;
    const mistakes = reader.diagnostics.length;
    const level = reader.level;
    const first = reader.peek();
    const formula = this.biconditional();
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
      free: this.skipped ? new Map() : this.#free,
      bound: new Set(this.#bound.keys()),
      bare: this.#atoms.bare,
      text: reader.excerpt(first, reader.last),
    };
  }

  protected override isAtomAhead(): boolean {
    return isTermAhead(this.reader);
  }

  protected override checkAfter(): void {
    const hint = hintBetweenFormulas(this.reader.peek());
    if (hint !== null) this.reader.failExpected("an operator between formulas", hint);
  }

  protected override atom(token: Token, isTerm: boolean): Formula {
    if (isTerm) return this.#atoms.readTerm();
    switch (token.kind) {
      case "forall":
      case "exists":
        return this.#quantified(token.kind);
      case "relation-sign":
        return this.#atoms.readSignFirst(token);
      case "word":
        return this.#atoms.readWord(token);
      default:
        return this.reader.failExpected("a formula");
    }
  }

  // Quantifiers

  #quantified(kind: "forall" | "exists"): Formula {
    const reader = this.reader;
    const sign = reader.next();
    reader.crossLine();
    const variables = readVariables(reader, sign);
    for (const { text } of variables) this.#bound.set(text, (this.#bound.get(text) ?? 0) + 1);
    for (const variable of variables) reader.enter(variable);
    const dotted = reader.accept("dot") !== null;
    reader.crossLine();
    const body = dotted ? this.biconditional() : this.unary();
    reader.level -= variables.length;
    for (const { text } of variables) this.#bound.set(text, this.#bound.get(text)! - 1);
    return quantify(
      kind,
      variables.map(({ text }) => text),
      body,
    );
  }
}
