/** Instances of clauses in the instantiation-based search, over one bank of terms. */

import type { AtomRecord, TermRecord } from "../../evidence/format.ts";
import { atomOf, atomTerms } from "../../logic/records/formulas.ts";
import { Substitution, shifted } from "../saturation/substitution.ts";
import { HEADER, IDENTITY, SHIFT, TermBank, variable } from "../saturation/terms.ts";
import type { BaseClause } from "./base-clauses.ts";

/** An instance of a base clause, or the clause itself. Its variables are 0, 1, …, each in some literal. */
export interface Instance {
  readonly number: number;
  readonly base: BaseClause;
  /** By variable of the base clause: what stands for it. */
  readonly terms: readonly number[];
  /** Twice the atom, and one more when it is negated. No literal twice, no two opposite. */
  readonly literals: readonly number[];
  /** The literals with one constant in place of all variables, as signed variables of the solver, in the same order. */
  readonly ground: readonly number[];
  /** Symbols and variables in the literals. */
  readonly weight: number;
  readonly isGround: boolean;
  /** How many variables it has. */
  readonly variables: number;
}

/** What becomes of an instance that is made: nothing when it is known, true by itself or too large. */
export type MadeInstance = Instance | "known" | "true" | "too-large";

export class InstanceMaker {
  readonly bank = new TermBank();
  readonly substitution = new Substitution(this.bank);
  /** The constant that stands for all variables in ground clauses. */
  readonly filler: number;
  readonly #newVariable: () => number;
  readonly #mostWeight: number;
  /** By ground atom: the solver's variable. */
  readonly #variables = new Map<number, number>();
  /** By variable of the solver: the ground atom. */
  readonly #atoms: number[] = [];
  readonly #grounded = new Map<number, number>();
  /** By term: the same with shifted variables. */
  readonly #shifted = new Map<number, number>();
  readonly #known = new Set<string>();
  #count = 0;

  /**
   * @param filler the name of the constant that stands for variables
   * @param newVariable makes variables of the solver
   * @param mostWeight symbols and variables that an instance may have
   */
  constructor(filler: string, newVariable: () => number, mostWeight: number) {
    this.filler = this.bank.make(this.bank.symbol(filler, 0, false), new Int32Array(0), 0);
    this.#newVariable = newVariable;
    this.#mostWeight = mostWeight;
  }

  /** The base clause as an instance of itself. */
  first(base: BaseClause): MadeInstance {
    const places = new Map(base.variables.map((name, place) => [name, variable(place)]));
    const literals = base.record.map(
      (literal) => 2 * this.#atom(atomOf(literal), places) + (literal[0] === "not" ? 1 : 0),
    );
    return this.#keep(
      base,
      base.variables.map((_, place) => variable(place)),
      literals,
    );
  }

  /** The base clause with these ground terms for its variables. */
  at(first: Instance, terms: readonly number[]): MadeInstance {
    const { substitution } = this;
    terms.forEach((term, place) => {
      substitution.unify(variable(place), term);
    });
    const made = this.instance(first, false);
    substitution.undo(0);
    return made;
  }

  /** A term with shifted variables. Kept, since terms are deep and take part again and again. */
  shifted(term: number): number {
    let known = this.#shifted.get(term);
    if (known === undefined) {
      known = shifted(this.bank, term);
      this.#shifted.set(term, known);
    }
    return known;
  }

  /** Whether the bindings merely rename the variables of an instance. */
  isRenamed({ variables }: Instance, isShifted: boolean): boolean {
    const { substitution } = this;
    substitution.beginInstance();
    for (let v = 0; v < variables; v += 1) {
      // The variables that are left get the numbers 0, 1, … as they are met.
      const value = substitution.instance(variable(isShifted ? v + SHIFT : v));
      if (value !== variable(v)) return false;
    }
    return true;
  }

  /**
   * An instance under the bindings of the substitution.
   * @param isShifted whether the bindings are for the clause with shifted variables
   */
  instance({ base, literals, terms }: Instance, isShifted: boolean): MadeInstance {
    const { substitution } = this;
    const of = (term: number) => substitution.instance(isShifted ? this.shifted(term) : term);
    substitution.beginInstance();
    const made: number[] = [];
    for (const literal of literals) {
      const atom = of(literal >> 1);
      if (atom === 0) return "too-large";
      const now = 2 * atom + (literal & 1);
      if (made.includes(now ^ 1)) return "true";
      if (!made.includes(now)) made.push(now);
    }
    const values: number[] = [];
    for (const term of terms) {
      const value = of(term);
      if (value === 0) return "too-large";
      values.push(value);
    }
    return this.#keep(base, values, made);
  }

  #keep(base: BaseClause, terms: readonly number[], literals: readonly number[]): MadeInstance {
    const { bank } = this;
    const key = literals.join();
    if (this.#known.has(key)) return "known";
    const weight = literals.reduce((sum, literal) => sum + bank.weight(literal >> 1), 0);
    if (weight > this.#mostWeight) return "too-large";
    this.#known.add(key);
    const ground = literals.map((literal) => {
      const solverVariable = this.#variableOf(this.#ground(literal >> 1));
      return (literal & 1) === 0 ? solverVariable : -solverVariable;
    });
    this.#count += 1;
    const variables = Math.max(0, ...literals.map((literal) => bank.variables(literal >> 1)));
    return {
      number: this.#count,
      base,
      terms,
      literals,
      ground,
      weight,
      isGround: variables === 0,
      variables,
    };
  }

  #variableOf(atom: number): number {
    let known = this.#variables.get(atom);
    if (known === undefined) {
      known = this.#newVariable();
      this.#variables.set(atom, known);
      this.#atoms[known] = atom;
    }
    return known;
  }

  /** A term with the filler in place of its variables. */
  #ground(term: number): number {
    if (term < 0) return this.filler;
    const { bank } = this;
    if (bank.isGround(term)) return term;
    let known = this.#grounded.get(term);
    if (known === undefined) {
      const symbol = bank.words[term]!;
      const args = new Int32Array(bank.arities[symbol]!);
      for (let place = 0; place < args.length; place += 1)
        args[place] = this.#ground(bank.words[term + HEADER + place]!);
      known = bank.make(symbol, args, 0);
      this.#grounded.set(term, known);
    }
    return known;
  }

  #atom(atom: AtomRecord, places: ReadonlyMap<string, number>): number {
    const args = Int32Array.from(atomTerms(atom), (term) => this.#term(term, places));
    const symbol = atom[0] === "=" ? IDENTITY : this.bank.symbol(atom[1] as string, args.length, true);
    return this.bank.make(symbol, args, 0);
  }

  #term(term: TermRecord, places: ReadonlyMap<string, number>): number {
    if (typeof term === "string") return places.get(term)!;
    const [name, ...rest] = term;
    const args = Int32Array.from(rest, (arg) => this.#term(arg, places));
    return this.bank.make(this.bank.symbol(name, args.length, false), args, 0);
  }

  /**
   * What stands for the variables of the base clause in the ground instance.
   * @param fillerRecord what the filler is there
   */
  record({ base, terms }: Instance, fillerRecord: TermRecord): Record<string, TermRecord> {
    return Object.fromEntries(
      base.variables.map((name, place) => [name, this.#recordOf(terms[place]!, fillerRecord)]),
    );
  }

  /** What a variable of the solver stands for. */
  atomRecord(solverVariable: number, fillerRecord: TermRecord): AtomRecord {
    const { bank } = this;
    const atom = this.#atoms[solverVariable]!;
    const symbol = bank.words[atom]!;
    const args = Array.from({ length: bank.arities[symbol]! }, (_, place) =>
      this.#recordOf(bank.words[atom + HEADER + place]!, fillerRecord),
    );
    return symbol === IDENTITY ? ["=", args[0]!, args[1]!] : ["is", bank.names[symbol]!, ...args];
  }

  #recordOf(term: number, fillerRecord: TermRecord): TermRecord {
    if (term < 0 || term === this.filler) return fillerRecord;
    const { bank } = this;
    const symbol = bank.words[term]!;
    const args: TermRecord[] = [];
    for (let place = 0; place < bank.arities[symbol]!; place += 1)
      args.push(this.#recordOf(bank.words[term + HEADER + place]!, fillerRecord));
    return [bank.names[symbol]!, ...args];
  }
}
