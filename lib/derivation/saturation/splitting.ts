/**
 * Splitting (Riazanov & Voronkov 2001; Voronkov 2014): a clause that falls into parts without common variables becomes
 * a clause of names, and each part a clause for the case that its name holds, "¬name ∨ part". A name is a relation of
 * no places that stands for the part: name ↔ ∀ variables of the part. The same part up to renaming has the same name
 * everywhere, and what is ground has the negated name of its negation.
 *
 * No inference uses names; what they are about is settled by `case-model.ts`.
 */
import type { Draft, DraftState } from "./draft.ts";
import { atomOf, comesBefore, isNegative, literalOf } from "./ordering.ts";
import { HEADER, indexOf, type TermBank, variable } from "./terms.ts";

/** What a name stands for: the disjunction of the literals, for all values of their variables 0, 1, …. */
export interface NamedPart {
  readonly name: string;
  /** The atom that the name is. */
  readonly atom: number;
  /** Of a ground part one positive literal. */
  readonly literals: readonly number[];
  readonly variables: number;
}

export class Splitting {
  /** By number of their names. */
  readonly named: NamedPart[] = [];
  /** Literals of all named parts. */
  size = 0;
  readonly #bank: TermBank;
  readonly #taken: ReadonlySet<string>;
  /** Numbers of names by the literals of their parts. */
  readonly #numbers = new Map<string, number>();
  /** The symbol that the first name is; the others follow. */
  readonly #firstSymbol: number;
  /** Literals of names for which it has been said what they say. */
  readonly #defined = new Set<number>();
  #lastName = 0;

  /** @param bank has all symbols of the task */
  constructor(bank: TermBank) {
    this.#bank = bank;
    this.#taken = new Set(bank.names);
    this.#firstSymbol = bank.names.length;
  }

  /** A name as a literal. */
  literalOf(number: number, negative: boolean): number {
    return literalOf(this.named[number]!.atom, negative);
  }

  /** The number of the name that a literal of a name is about. */
  numberOf(literal: number): number {
    return this.#bank.words[atomOf(literal)]! - this.#firstSymbol;
  }

  /**
   * Puts names for the parts of the draft if it has several.
   * @returns the names, as literals; none if it stays as it is
   */
  split(draft: Draft): { readonly names: readonly number[]; readonly state: DraftState } {
    let state: DraftState = "clause";
    const names: number[] = [];
    if (draft.length < 2) return { names, state };
    const parts = partsOf(this.#bank, draft.literals, draft.length).map(({ places }) =>
      places.map((place) => draft.literals[place]!),
    );
    if (parts.length < 2) return { names, state };
    for (const part of parts) {
      const name = this.#nameFor(part);
      names.push(name);
      state = draft.name(draft.literals.indexOf(part[0]!), name);
      if (state !== "clause") break;
    }
    return { names, state };
  }

  /** Makes the draft what a name says when it holds; null if that has been done before. */
  define(name: number, draft: Draft): DraftState | null {
    if (this.#defined.has(name)) return null;
    this.#defined.add(name);
    const number = this.numberOf(name);
    return draft.define(number, this.named[number]!, isNegative(name) ? 1 : 0);
  }

  /** The name for some literals that are a part, negated where they are the negation of what has a name. */
  #nameFor(part: readonly number[]): number {
    const isGround = this.#bank.variables(atomOf(part[0]!)) === 0;
    const negative = isGround && isNegative(part[0]!);
    const { literals, variables } = canonical(this.#bank, negative ? [part[0]! ^ 1] : part);
    const key = literals.join(" ");
    let number = this.#numbers.get(key);
    if (number === undefined) {
      number = this.named.length;
      this.#numbers.set(key, number);
      this.#add(literals, variables.length);
    }
    return this.literalOf(number, negative);
  }

  #add(literals: readonly number[], variables: number): void {
    let name: string;
    do {
      this.#lastName += 1;
      name = `case${this.#lastName}`;
    } while (this.#taken.has(name));
    const symbol = this.#bank.addName(name);
    this.named.push({ name, atom: this.#bank.make(symbol, NO_ARGUMENTS, 0), literals, variables });
    this.size += literals.length;
  }
}

const NO_ARGUMENTS = new Int32Array(0);

/** The parts of a clause as places in it, ascending, by their first places; names are none. */
export function partsOf(
  bank: TermBank,
  literals: Int32Array,
  length: number,
): readonly { readonly places: readonly number[] }[] {
  const parts: { readonly places: number[]; readonly variables: Set<number> }[] = [];
  for (let place = 0; place < length; place += 1) {
    const atom = atomOf(literals[place]!);
    if (bank.isName[bank.words[atom]!]) continue;
    const variables = new Set<number>();
    addVariables(bank, atom, variables);
    const part = { places: [place], variables };
    for (let k = parts.length - 1; k >= 0; k -= 1) {
      const other = parts[k]!;
      if (!meet(other.variables, variables)) continue;
      part.places.push(...other.places);
      for (const v of other.variables) variables.add(v);
      parts.splice(k, 1);
    }
    parts.push(part);
  }
  for (const part of parts) part.places.sort((a, b) => a - b);
  return parts.sort((a, b) => a.places[0]! - b.places[0]!);
}

function meet(left: ReadonlySet<number>, right: ReadonlySet<number>): boolean {
  for (const v of right) if (left.has(v)) return true;
  return false;
}

function addVariables(bank: TermBank, term: number, found: Set<number>): void {
  if (term < 0) {
    found.add(indexOf(term));
    return;
  }
  if (bank.isGround(term)) return;
  const end = term + HEADER + bank.arities[bank.words[term]!]!;
  for (let k = term + HEADER; k < end; k += 1) addVariables(bank, bank.words[k]!, found);
}

/**
 * Literals in an order that depends little on names of variables, those numbered from 0 as they occur; and by new number
 * the old variable. The same literals nearly always look the same.
 */
export function canonical(
  bank: TermBank,
  part: readonly number[],
): { readonly literals: readonly number[]; readonly variables: readonly number[] } {
  const variables: number[] = [];
  const sorted = [...part].sort((a, b) => (comesBefore(bank, a, b) ? -1 : comesBefore(bank, b, a) ? 1 : 0));
  const literals = sorted.map((literal) => literalOf(renamed(atomOf(literal)), isNegative(literal)));
  return { literals, variables };

  function renamed(term: number): number {
    if (term < 0) {
      let place = variables.indexOf(indexOf(term));
      if (place < 0) place = variables.push(indexOf(term)) - 1;
      return variable(place);
    }
    if (bank.isGround(term)) return term;
    const symbol = bank.words[term]!;
    const args = new Int32Array(bank.arities[symbol]!);
    for (let k = 0; k < args.length; k += 1) args[k] = renamed(bank.words[term + HEADER + k]!);
    return bank.make(symbol, args, 0);
  }
}
