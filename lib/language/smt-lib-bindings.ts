/** What the symbols that quantifiers, `let` and parameters bind stand for, at a place of SMT-LIB text. */
import { type Formula, freeVariables, type Variable } from "../logic/formula.ts";
import { variableOfSymbol } from "./smt-lib-symbols.ts";

/** A formula as it is built, measured on the way, since `let` can make it grow with every use. */
export interface Made {
  readonly kind: "formula";
  readonly formula: Formula;
  readonly parts: number;
  readonly nesting: number;
}
export type Value = Made | { readonly kind: "element"; readonly variable: Variable };

/** Changed in place: bindings are released in the opposite order. Finding and binding take no time to speak of. */
export class Bindings {
  /** For each symbol, its values, innermost last. */
  readonly #stacks = new Map<string, Value[]>();
  /** How many values that can be seen speak of each variable. */
  readonly #uses = new Map<Variable, number>();

  find(symbol: string): Value | undefined {
    return this.#stacks.get(symbol)?.at(-1);
  }

  #count(value: Value | undefined, change: 1 | -1): void {
    if (value === undefined) return;
    const variables = value.kind === "element" ? [value.variable] : freeVariables(value.formula);
    for (const variable of variables) this.#uses.set(variable, (this.#uses.get(variable) ?? 0) + change);
  }

  /** Binds a symbol; a value that it had is hidden until this one is released. */
  bind(symbol: string, value: Value): void {
    const stack = this.#stacks.get(symbol) ?? [];
    this.#count(stack.at(-1), -1);
    stack.push(value);
    this.#stacks.set(symbol, stack);
    this.#count(value, 1);
  }

  /** Binds symbols to variables, each under a name that nothing that can still be seen is called by. */
  bindElements(symbols: readonly string[]): readonly Variable[] {
    const own = new Set(symbols);
    // What the list itself hides may be called the same.
    for (const symbol of symbols) this.#count(this.find(symbol), -1);
    const names: Variable[] = [];
    const chosen = new Set<Variable>();
    for (const symbol of symbols) {
      const variable = variableOfSymbol(
        symbol,
        (name) => (this.#uses.get(name) ?? 0) > 0 || chosen.has(name) || (name !== symbol && own.has(name)),
      );
      chosen.add(variable);
      names.push(variable);
    }
    for (const symbol of symbols) this.#count(this.find(symbol), 1);
    for (const [index, symbol] of symbols.entries())
      this.bind(symbol, { kind: "element", variable: names[index]! });
    return names;
  }

  release(symbols: readonly string[]): void {
    for (const symbol of symbols) {
      const stack = this.#stacks.get(symbol)!;
      this.#count(stack.pop(), -1);
      this.#count(stack.at(-1), 1);
    }
  }
}
