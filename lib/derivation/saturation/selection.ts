/** Which literals of a clause take part in inferences. */
import type { ClauseStore } from "./clauses.ts";
import { atomOf, isNegative, type Ordering } from "./ordering.ts";
import type { Strategy } from "./strategy.ts";
import type { TermBank } from "./terms.ts";

export class Selection {
  readonly #bank: TermBank;
  readonly #store: ClauseStore;
  readonly #ordering: Ordering;
  readonly #strategy: Strategy;
  readonly #partnersOf: (literal: number) => number;

  /** @param partnersOf how many active literals there are that a literal may be resolved with, about */
  constructor(
    bank: TermBank,
    store: ClauseStore,
    ordering: Ordering,
    strategy: Strategy,
    partnersOf: (literal: number) => number,
  ) {
    this.#bank = bank;
    this.#store = store;
    this.#ordering = ordering;
    this.#strategy = strategy;
    this.#partnersOf = partnersOf;
  }

  /**
   * Either one negative literal, which is selected, or all that are maximal in the ordering, positive ones only if no
   * other one is equal: places of literals, ascending. Names take no part.
   */
  eligible(clause: number): readonly number[] {
    const all = Array.from({ length: this.#store.length(clause) }, (_, k) => this.#store.literal(clause, k));
    // Names come last.
    const names = all.findIndex((literal) => this.#bank.isName[this.#bank.words[atomOf(literal)]!]);
    const literals = names >= 0 ? all.slice(0, names) : all;
    if (literals.length <= 1) return literals.map((_, k) => k);
    if (this.#strategy.selection === "none") return this.#maximal(literals);
    const negative = literals.flatMap((literal, k) => (isNegative(literal) ? [k] : []));
    if (negative.length === 0) return this.#maximal(literals);
    if (this.#strategy.selectsSparingly) {
      const maximal = this.#maximal(literals);
      if (maximal.length === 1 && !isNegative(literals[maximal[0]!]!)) return maximal;
    }
    return [this.#best(negative, literals)];
  }

  #maximal(literals: readonly number[]): readonly number[] {
    const all = literals.map((_, k) => k);
    if (this.#strategy.ordering === "none") return all;
    return all.filter((k) =>
      all.every((j) => j === k || this.#ordering.compareLiterals(literals[j]!, literals[k]!) !== "greater"),
    );
  }

  #best(places: readonly number[], literals: readonly number[]): number {
    let best = places[0]!;
    let bestValue = this.#value(literals[best]!);
    for (const place of places) {
      const value = this.#value(literals[place]!);
      if (value <= bestValue) continue;
      best = place;
      bestValue = value;
    }
    return best;
  }

  #value(literal: number): number {
    const atom = atomOf(literal);
    const weight = this.#bank.weight(atom);
    switch (this.#strategy.selection) {
      case "lightest":
        return -weight;
      case "groundest":
        return weight - 1000 * this.#variablesIn(atom);
      case "fewest-partners":
        return weight - 1000 * this.#partnersOf(literal);
      default:
        return weight;
    }
  }

  /** Different variables of an atom. */
  #variablesIn(atom: number): number {
    let count = 0;
    for (let v = 0; v < this.#bank.variables(atom); v += 1) if (this.#bank.occurs(v, atom)) count += 1;
    return count;
  }
}
