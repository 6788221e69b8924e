/**
 * Connectives, from the loosest to the tightest, over whatever stands between them: formulas of first-order logic, and
 * what definitions say of the elements of a carrier.
 */
import type { Token } from "./lexer.ts";
import { type Reader, Unreadable } from "./reader.ts";
import { signOf } from "./tokens.ts";

/** How formulas of a kind are made of smaller ones. */
export interface Connectives<F> {
  readonly true: F;
  readonly false: F;
  not(body: F): F;
  /** Of at least two. */
  and(parts: readonly F[]): F;
  or(parts: readonly F[]): F;
  implies(left: F, right: F): F;
  iff(left: F, right: F): F;
}

/** Reads formulas of a kind; what is neither a connective nor a bracket is read by the one that extends it. */
export abstract class ConnectiveReader<F> {
  protected readonly reader: Reader;
  readonly #make: Connectives<F>;
  /** Whether text was passed over after a mistake. */
  protected skipped = false;

  constructor(reader: Reader, make: Connectives<F>) {
    this.reader = reader;
    this.#make = make;
  }

  /**
   * Reads what begins with a token that is no sign of a connective and opens no bracket.
   * @param isAhead what {@link isAtomAhead} said of it
   */
  protected abstract atom(token: Token, isAhead: boolean): F;

  /** Whether a bracket, a sign or a word that comes next belongs to an atom. */
  protected isAtomAhead(): boolean {
    return false;
  }

  /** Reports what may not follow a formula without an operator between. */
  protected checkAfter(): void {}

  /** Whether the `and` or `or` that comes next ends the formula. */
  protected endsBefore(): boolean {
    return false;
  }

  protected biconditional(): F {
    const left = this.#conditional();
    if (!this.reader.at("iff")) return left;
    return this.#make.iff(
      left,
      this.#right(() => this.biconditional()),
    );
  }

  #conditional(): F {
    const left = this.#disjunction();
    if (!this.reader.at("implies")) return left;
    return this.#make.implies(
      left,
      this.#right(() => this.#conditional()),
    );
  }

  #right(read: () => F): F {
    const sign = this.reader.next();
    this.reader.crossLine();
    this.reader.enter(sign);
    const formula = read();
    this.reader.level -= 1;
    return formula;
  }

  #disjunction(): F {
    return this.#row("or", () => this.#row("and", () => this.#operand(), this.#make.and), this.#make.or);
  }

  #row(sign: "and" | "or", read: () => F, join: (parts: readonly F[]) => F): F {
    const first = read();
    if (!this.reader.at(sign) || this.endsBefore()) return first;
    const parts = [first];
    while (this.reader.at(sign) && !this.endsBefore()) {
      this.reader.next();
      this.reader.crossLine();
      parts.push(read());
    }
    return join(parts);
  }

  #operand(): F {
    const formula = this.unary();
    this.checkAfter();
    return formula;
  }

  protected unary(): F {
    const { reader } = this;
    const token = reader.peek();
    if (this.isAtomAhead()) return this.atom(token, true);
    switch (token.kind) {
      case "not": {
        reader.next();
        reader.crossLine();
        reader.enter(token);
        const body = this.unary();
        reader.level -= 1;
        return this.#make.not(body);
      }
      case "true":
      case "false":
        reader.next();
        return this.#make[token.kind];
      case "open":
        return this.#group();
      case "open-brace":
        return reader.failExpected(
          "a formula",
          "a theory cannot stand where a formula is meant: use ( ) as brackets",
        );
      case "and":
      case "or":
      case "implies":
      case "iff":
        return reader.failExpected("a formula", lineHint(token));
      default:
        return this.atom(token, false);
    }
  }

  #group(): F {
    const { reader } = this;
    const mark = reader.mark;
    const open = reader.next();
    reader.enter(open);
    const { level } = reader;
    return reader.withLines(false, () => {
      let formula: F;
      try {
        formula = this.biconditional();
        reader.close(open, "an operator or `)`");
      } catch (error) {
        if (!(error instanceof Unreadable) || error.beyondBrackets) throw error;
        this.skipped = true;
        if (!reader.skipGroup(mark)) throw error;
        formula = this.#make.true;
      }
      reader.level = level - 1;
      return formula;
    });
  }
}

function lineHint(token: Token): string | null {
  if (!token.lineStart) return null;
  return `end the line before with \`${signOf(token.kind as "and").symbol}\`, or put the formula in brackets: then it goes on`;
}
