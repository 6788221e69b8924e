/** Clauses as evidence writes them, taken into a term bank, and an ordering for their symbols. */
import type { AtomRecord, ClauseRecord, TermRecord } from "../../evidence/format.ts";
import type { ClauseTask } from "../refutation.ts";
import { atomOf, literalOf, Ordering } from "./ordering.ts";
import type { Strategy } from "./strategy.ts";
import { HEADER, IDENTITY, type TermBank, variable } from "./terms.ts";

/** An input clause, and its variables' names: variable v is `names[v]`. */
export interface ReadClause {
  readonly literals: readonly number[];
  readonly names: readonly string[];
}

export function readClause(bank: TermBank, clause: ClauseRecord): ReadClause {
  const names: string[] = [];
  const literals = clause.map((literal) =>
    literal[0] === "not" ? literalOf(readAtom(literal[1]), true) : literalOf(readAtom(literal), false),
  );
  return { literals, names };

  function readAtom(atom: AtomRecord): number {
    const terms = (atom[0] === "=" ? atom.slice(1) : atom.slice(2)) as TermRecord[];
    const symbol = atom[0] === "=" ? IDENTITY : bank.symbol(atom[1] as string, terms.length, true);
    return bank.make(symbol, Int32Array.from(terms, readTerm), 0);
  }

  function readTerm(term: TermRecord): number {
    if (typeof term === "string") {
      let place = names.indexOf(term);
      if (place < 0) place = names.push(term) - 1;
      return variable(place);
    }
    const [name, ...args] = term;
    return bank.make(bank.symbol(name, args.length, false), Int32Array.from(args, readTerm), 0);
  }
}

/** The ordering that a strategy wants for the symbols of some clauses. */
export function orderingFor(bank: TermBank, clauses: readonly ReadClause[], strategy: Strategy): Ordering {
  const occurrences = bank.names.map(() => 0);
  for (const { literals } of clauses) for (const literal of literals) count(atomOf(literal));
  const symbols = bank.names.map((_, symbol) => symbol);
  const value = (symbol: number) =>
    strategy.precedence === "places"
      ? bank.arities[symbol]!
      : strategy.precedence === "rare"
        ? -occurrences[symbol]!
        : occurrences[symbol]!;
  symbols.sort((a, b) => value(a) - value(b) || a - b);
  const precedence = symbols.map(() => 0);
  symbols.forEach((symbol, place) => {
    precedence[symbol] = place;
  });
  return new Ordering(bank, precedence, strategy.ordering !== "path");

  function count(term: number): void {
    if (term < 0) return;
    const symbol = bank.words[term]!;
    occurrences[symbol]! += 1;
    for (let k = 0; k < bank.arities[symbol]!; k += 1) count(bank.words[term + HEADER + k]!);
  }
}

/** The functions that occur in goal clauses, by symbol. */
export function goalFunctions(bank: TermBank, clauses: readonly ReadClause[], task: ClauseTask): boolean[] {
  const found = bank.names.map(() => false);
  clauses.forEach(({ literals }, place) => {
    if (task.clauses[place]!.goal) for (const literal of literals) mark(atomOf(literal));
  });
  return found;

  function mark(term: number): void {
    if (term < 0) return;
    found[bank.words[term]!] = true;
    for (let k = 0; k < bank.arities[bank.words[term]!]!; k += 1) mark(bank.words[term + HEADER + k]!);
  }
}
