/**
 * The clause under construction: an inference writes its conclusion here, simplifications change it, and it is stored
 * only if it is worth keeping. Search and replay (`replay.ts`) both work by these operations, so that the short record
 * of an operation is enough to do it again.
 */
import type { ClauseStore } from "./clauses.ts";
import { atomOf, comesBefore, isNegative, literalOf, type Ordering } from "./ordering.ts";
import { type NamedPart, partsOf } from "./splitting.ts";
import { type Substitution, shifted } from "./substitution.ts";
import { HEADER, IDENTITY, SHIFT, type TermBank, variable } from "./terms.ts";

/**
 * A record begins with one of the first eight operations and goes on with simplifications. After the operation stand:
 * literals as their places in the clause, sides of an equation as 0 or 1, and places in an atom in reading order.
 */
export const Rule = {
  /** input */
  input: 0,
  /** clause */
  copy: 1,
  /** clause (with variables shifted), literal, clause, literal */
  resolve: 2,
  /** clause, literal, literal: the second goes */
  factor: 3,
  /** equation's clause, literal, side, clause, literal, place, 1 if the first's variables are shifted, else 0 */
  superpose: 4,
  /** clause, literal */
  reflect: 5,
  /** clause, literal, side, literal, side: of s = t and s = u, the first becomes t ≠ u */
  equate: 6,
  /** name, 0 for ¬name ∨ part, or of a ground part 1 for name ∨ ¬part */
  define: 7,
  /** literal x ≠ t (Bachmair & Ganzinger 1994 call the step equality resolution) */
  eliminate: 8,
  /** literal, place, unit clause, side */
  rewrite: 9,
  /** literal, unit clause, 1 if the sides of an equation are exchanged, else 0 */
  cut: 10,
  /** a literal of the part, the literal of its name */
  name: 11,
} as const;

/** Words that a record has for each rule, the rule among them. */
export const RECORD_WORDS: readonly number[] = [2, 2, 5, 4, 8, 3, 6, 3, 2, 5, 4, 3];

/** Literals that a clause may have at all. */
const LONGEST_CLAUSE = 120;
/** Variables that a clause may have; with those of another one they stay below the numbers of {@link SHIFT}. */
const MOST_VARIABLES = SHIFT / 2;

/** What the draft has become by the last operation. */
export type DraftState = "clause" | "true" | "too-large";

export class Draft {
  readonly literals = new Int32Array(2 * LONGEST_CLAUSE + 2);
  length = 0;
  /** All variables are less. */
  variables = 0;
  readonly record = new Int32Array(4096);
  recordLength = 0;
  /** Literals t ≠ t that were dropped by the last operation: the terms t. */
  readonly dropped: number[] = [];
  /** Equations that the last operation turned: s, t, and 1 for s ≠ t or 0 for s = t, of what now is t = s or t ≠ s. */
  readonly turned: number[] = [];

  readonly #bank: TermBank;
  readonly #store: ClauseStore;
  readonly #ordering: Ordering;
  readonly #substitution: Substitution;
  /** The literals of the given clause with variables shifted. */
  readonly given: number[] = [];
  readonly #pair = new Int32Array(2);

  constructor(bank: TermBank, store: ClauseStore, ordering: Ordering, substitution: Substitution) {
    this.#bank = bank;
    this.#store = store;
    this.#ordering = ordering;
    this.#substitution = substitution;
  }

  /** Prepares a clause to be the one whose variables are shifted. */
  setGiven(clause: number): void {
    this.given.length = 0;
    for (let k = 0; k < this.#store.length(clause); k += 1) {
      const literal = this.#store.literal(clause, k);
      this.given.push(literalOf(shifted(this.#bank, atomOf(literal)), isNegative(literal)));
    }
  }

  #begin(...record: number[]): void {
    for (let k = 0; k < record.length; k += 1) this.record[k] = record[k]!;
    this.recordLength = record.length;
    this.length = 0;
  }

  #note(...record: number[]): void {
    for (let k = 0; k < record.length; k += 1) this.record[this.recordLength++] = record[k]!;
  }

  copy(clause: number): DraftState {
    this.#begin(Rule.copy, clause);
    this.length = this.#store.length(clause);
    for (let k = 0; k < this.length; k += 1) this.literals[k] = this.#store.literal(clause, k);
    this.variables = this.#store.variables(clause);
    return this.#tidy();
  }

  /** Takes literals for an input clause. */
  input(number: number, literals: readonly number[], variables: number): DraftState {
    this.#begin(Rule.input, number);
    if (literals.length > LONGEST_CLAUSE || variables > MOST_VARIABLES) return "too-large";
    this.length = literals.length;
    for (let k = 0; k < this.length; k += 1) this.literals[k] = literals[k]!;
    this.variables = variables;
    return this.#tidy();
  }

  /** Takes what it is that a name stands for: either direction of its definition. */
  define(number: number, { atom, literals, variables }: NamedPart, direction: 0 | 1): DraftState {
    this.#begin(Rule.define, number, direction);
    this.literals[0] = literalOf(atom, direction === 0);
    this.length = literals.length + 1;
    for (let k = 0; k < literals.length; k += 1) this.literals[k + 1] = literals[k]! ^ direction;
    this.variables = variables;
    return this.#tidy();
  }

  /** Adds the instances of a clause's literals but one; false when one is too large. */
  #addRest(clause: number, isGiven: boolean, without: number, alsoWithout = -1): boolean {
    const length = this.#store.length(clause);
    for (let k = 0; k < length; k += 1) {
      if (k === without || k === alsoWithout) continue;
      if (!this.#add(isGiven ? this.given[k]! : this.#store.literal(clause, k))) return false;
    }
    return true;
  }

  #add(literal: number): boolean {
    const atom = this.#substitution.instance(atomOf(literal));
    if (atom === 0 || this.length > 2 * LONGEST_CLAUSE) return false;
    this.literals[this.length++] = literalOf(atom, isNegative(literal));
    return true;
  }

  #finish(): DraftState {
    this.variables = this.#substitution.instanceVariables;
    if (this.variables > MOST_VARIABLES) return "too-large";
    return this.#tidy();
  }

  /** The resolvent of the given clause and another one, whose atoms have been unified. */
  resolve(given: number, own: number, other: number, its: number): DraftState {
    this.#begin(Rule.resolve, given, own, other, its);
    this.#substitution.beginInstance();
    if (!this.#addRest(given, true, own) || !this.#addRest(other, false, its)) return "too-large";
    return this.#finish();
  }

  /** A clause whose literals `stays` and `goes` have been unified, without the latter. */
  factor(clause: number, stays: number, goes: number): DraftState {
    this.#begin(Rule.factor, clause, stays, goes);
    this.#substitution.beginInstance();
    if (!this.#addRest(clause, false, goes)) return "too-large";
    return this.#finish();
  }

  /** Rewrites at a place that has been unified with a side of an equation. */
  superpose(
    from: number,
    equation: number,
    side: number,
    into: number,
    literal: number,
    place: number,
    fromIsGiven: boolean,
  ): DraftState {
    this.#begin(Rule.superpose, from, equation, side, into, literal, place, fromIsGiven ? 1 : 0);
    this.#substitution.beginInstance();
    const atom = atomOf(fromIsGiven ? this.given[equation]! : this.#store.literal(from, equation));
    const replacement = this.#bank.words[atom + HEADER + 1 - side]!;
    const target = fromIsGiven ? this.#store.literal(into, literal) : this.given[literal]!;
    const made = this.#substitution.instanceWith(atomOf(target), place, replacement);
    if (made === 0) return "too-large";
    this.literals[this.length++] = literalOf(made, isNegative(target));
    if (!this.#addRest(into, !fromIsGiven, literal) || !this.#addRest(from, fromIsGiven, equation))
      return "too-large";
    return this.#finish();
  }

  /** A clause without a literal s ≠ t whose sides have been unified. */
  reflect(clause: number, literal: number): DraftState {
    this.#begin(Rule.reflect, clause, literal);
    this.#substitution.beginInstance();
    if (!this.#addRest(clause, false, literal)) return "too-large";
    return this.#finish();
  }

  /** Equality factoring (Bachmair & Ganzinger 1994); the sides named have been unified. */
  equate(clause: number, first: number, side: number, second: number, itsSide: number): DraftState {
    this.#begin(Rule.equate, clause, first, side, second, itsSide);
    this.#substitution.beginInstance();
    const { words } = this.#bank;
    this.#pair[0] = words[atomOf(this.#store.literal(clause, first)) + HEADER + 1 - side]!;
    this.#pair[1] = words[atomOf(this.#store.literal(clause, second)) + HEADER + 1 - itsSide]!;
    const atom = this.#bank.make(IDENTITY, this.#pair, 0);
    if (!this.#add(literalOf(atom, true)) || !this.#addRest(clause, false, first)) return "too-large";
    return this.#finish();
  }

  /** Puts t for x where the draft has x ≠ t, and x is not in t. */
  eliminate(literal: number): DraftState {
    this.#note(Rule.eliminate, literal);
    const atom = atomOf(this.literals[literal]!);
    const mark = this.#substitution.mark;
    this.#substitution.unify(this.#bank.words[atom + HEADER]!, this.#bank.words[atom + HEADER + 1]!);
    this.#substitution.beginInstance();
    const old = this.literals.slice(0, this.length);
    this.length = 0;
    let isSmall = true;
    for (let k = 0; k < old.length && isSmall; k += 1) if (k !== literal) isSmall = this.#add(old[k]!);
    this.eliminated = [];
    for (let v = 0; v < this.variables; v += 1)
      this.eliminated.push(this.#substitution.instance(variable(v)));
    this.#substitution.undo(mark);
    return isSmall ? this.#finish() : "too-large";
  }
  /** What each variable became by the last {@link eliminate}. */
  eliminated: number[] = [];

  /** Puts a term, an instance of the unit equation's other side, at a place of a literal. */
  rewrite(literal: number, place: number, unit: number, side: number, term: number): DraftState {
    this.#note(Rule.rewrite, literal, place, unit, side);
    const old = this.literals[literal]!;
    this.literals[literal] = literalOf(replaced(this.#bank, atomOf(old), place, term), isNegative(old));
    this.#addNames(unit);
    return this.#tidy();
  }

  /** Drops a literal that a unit clause contradicts. */
  cut(literal: number, unit: number, exchanged: boolean): DraftState {
    this.#note(Rule.cut, literal, unit, exchanged ? 1 : 0);
    this.length -= 1;
    for (let k = literal; k < this.length; k += 1) this.literals[k] = this.literals[k + 1]!;
    this.#addNames(unit);
    return this.#tidy();
  }

  /** Adds the names of a unit clause, which are all its literals but the first. */
  #addNames(unit: number): void {
    for (let k = 1; k < this.#store.length(unit); k += 1)
      this.literals[this.length++] = this.#store.literal(unit, k);
  }

  /** Puts a name for a part of which one literal is given. */
  name(literal: number, name: number): DraftState {
    this.#note(Rule.name, literal, name);
    const { places } = partsOf(this.#bank, this.literals, this.length).find((part) =>
      part.places.includes(literal),
    )!;
    let length = 0;
    for (let k = 0; k < this.length; k += 1)
      if (!places.includes(k)) this.literals[length++] = this.literals[k]!;
    this.literals[length] = name;
    this.length = length + 1;
    return this.#tidy();
  }

  /** Drops literals that occur twice and t ≠ t, turns equations greater side first, and sees what is always true. */
  #tidy(): DraftState {
    this.dropped.length = 0;
    this.turned.length = 0;
    const { words } = this.#bank;
    let length = 0;
    next: for (let k = 0; k < this.length; k += 1) {
      let literal = this.literals[k]!;
      const atom = atomOf(literal);
      let twin = 0;
      if (words[atom] === IDENTITY) {
        const s = words[atom + HEADER]!;
        const t = words[atom + HEADER + 1]!;
        if (s === t) {
          if (!isNegative(literal)) return "true";
          this.dropped.push(s);
          continue;
        }
        this.#pair[0] = t;
        this.#pair[1] = s;
        twin = literalOf(this.#bank.make(IDENTITY, this.#pair, 0), isNegative(literal));
        if (this.#ordering.compare(s, t) === "less" || this.#occursBefore(twin, length)) {
          this.turned.push(s, t, isNegative(literal) ? 1 : 0);
          literal = twin;
          twin = literalOf(atom, isNegative(literal));
        }
      }
      for (let earlier = 0; earlier < length; earlier += 1) {
        const other = this.literals[earlier]!;
        if (other === literal) continue next;
        if (other === (literal ^ 1) || (twin !== 0 && other === (twin ^ 1))) return "true";
      }
      this.literals[length++] = literal;
    }
    this.length = length;
    return length > LONGEST_CLAUSE ? "too-large" : "clause";
  }

  #occursBefore(literal: number, length: number): boolean {
    for (let k = 0; k < length; k += 1) if (this.literals[k] === literal) return true;
    return false;
  }

  /**
   * Brings the literals into an order that depends little on names of variables, and numbers the variables anew.
   * The substitution then has for each old variable the new one as its instance. False when a term is too large.
   */
  settle(): boolean {
    const { literals, length } = this;
    for (let k = 1; k < length; k += 1) {
      const literal = literals[k]!;
      let place = k;
      while (place > 0 && comesBefore(this.#bank, literal, literals[place - 1]!)) {
        literals[place] = literals[place - 1]!;
        place -= 1;
      }
      literals[place] = literal;
    }
    this.#substitution.beginInstance();
    for (let k = 0; k < length; k += 1) {
      const literal = literals[k]!;
      const atom = this.#substitution.instance(atomOf(literal));
      if (atom === 0) return false;
      literals[k] = literalOf(atom, isNegative(literal));
    }
    this.variables = this.#substitution.instanceVariables;
    return true;
  }
}

/** A term with another in place of the subterm at a place, counted in reading order from 0. */
export function replaced(bank: TermBank, term: number, place: number, replacement: number): number {
  let left = place;
  return put(term);

  function put(part: number): number {
    if (left === 0) {
      left = -1;
      return replacement;
    }
    left -= 1;
    if (part < 0) return part;
    const symbol = bank.words[part]!;
    const args = new Int32Array(bank.arities[symbol]!);
    for (let k = 0; k < args.length; k += 1) {
      const arg = bank.words[part + HEADER + k]!;
      args[k] = left < 0 ? arg : put(arg);
    }
    return bank.make(symbol, args, 0);
  }
}
