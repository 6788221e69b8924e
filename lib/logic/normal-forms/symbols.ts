/** Names for the functions and relations that a form adds. */
import type { Formula } from "../formula.ts";
import { relationsOf, variablesOf } from "../formula.ts";

const CONSTANTS = ["c", "d"];
const FUNCTIONS = ["f", "g", "h"];
const RELATIONS = ["D"];

/** Gives names that occur in none of the formulas and that it has not given before. */
export class SymbolNames {
  readonly #taken = new Set<string>();
  /** By the letters tried: the number that comes next; 0 while there are bare letters to try. */
  readonly #next = new Map<readonly string[], number>();

  constructor(formulas: readonly Formula[]) {
    for (const formula of formulas) {
      for (const variable of variablesOf(formula)) this.#taken.add(variable);
      for (const relation of relationsOf(formula)) this.#taken.add(relation.name);
    }
  }

  /** `c`, `d`, `c1`, … for constants, `f`, `g`, `h`, `f1`, … for functions. */
  functionName(places: number): string {
    return this.#give(places === 0 ? CONSTANTS : FUNCTIONS, 0);
  }

  /** `D1`, `D2`, … */
  relationName(): string {
    return this.#give(RELATIONS, 1);
  }

  #give(letters: readonly string[], from: number): string {
    for (let number = this.#next.get(letters) ?? from; ; number += 1) {
      this.#next.set(letters, number);
      const names = number === 0 ? letters : [`${letters[0]}${number}`];
      const name = names.find((one) => !this.#taken.has(one));
      if (name === undefined) continue;
      this.#taken.add(name);
      return name;
    }
  }
}
