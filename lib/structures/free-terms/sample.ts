/**
 * A quick look at whether sentences could be true in a structure of free terms: quantifiers range over a few small terms
 * only. What comes of it is no more than a hint for the search.
 */
import type { TermsRecord } from "../../carriers/free-terms.ts";
import type { Meter } from "../../logic/meter.ts";
import {
  atomTerms,
  type FormulaRecord,
  partsOf,
  type TermFormulaRecord,
  type TermRecord,
} from "../../logic/records/formulas.ts";

/** Terms that ∀ ranges over, and that ∃ ranges over at most. */
const FEW = 6;
const MORE = 60;

/** A ground term, made once, so that the same terms are the same object. */
interface Element {
  readonly symbol: string;
  readonly args: readonly Element[];
  readonly id: number;
}
type Values = ReadonlyMap<string, Element>;

export class Sample {
  readonly #record: TermsRecord;
  readonly #meter: Meter;
  readonly #elements = new Map<string, Element>();
  readonly #facts = new Map<string, boolean>();
  readonly #few: readonly Element[];
  readonly #more: readonly Element[];

  constructor(record: TermsRecord, meter: Meter) {
    this.#record = record;
    this.#meter = meter;
    let all: readonly Element[] = [];
    while (all.length < FEW) all = this.#extended(all, FEW * FEW);
    this.#few = all.slice(0, FEW);
    this.#more = this.#extended(this.#few, MORE);
  }

  /** Whether the sentence is true when ∀ ranges over a few elements and ∃ over all that are made of them. */
  seemsTrue(sentence: FormulaRecord): boolean {
    return this.#isTrue(sentence, true, new Map());
  }

  /** The elements, and those made of them by one more constructor. */
  #extended(elements: readonly Element[], most: number): readonly Element[] {
    const found = new Set(elements);
    for (const [symbol, { length }] of Object.entries(this.#record.constructors)) {
      let lists: readonly (readonly Element[])[] = [[]];
      for (let place = 0; place < length; place += 1)
        lists = lists.flatMap((list) => elements.map((element) => [...list, element])).slice(0, most);
      for (const args of lists) {
        if (found.size >= most) break;
        found.add(this.#element(symbol, args));
      }
    }
    return [...found];
  }

  #element(symbol: string, args: readonly Element[]): Element {
    const key = `${symbol} ${args.map(({ id }) => id).join()}`;
    let element = this.#elements.get(key);
    if (element === undefined) {
      element = { symbol, args, id: this.#elements.size };
      this.#elements.set(key, element);
    }
    return element;
  }

  #isTrue(formula: TermFormulaRecord, sign: boolean, values: Values): boolean {
    this.#meter.charge(1);
    const part = (inner: TermFormulaRecord) => this.#isTrue(inner, sign, values);
    switch (formula[0]) {
      case "true":
      case "false":
        return (formula[0] === "true") === sign;
      case "=": {
        const [left, right] = atomTerms(formula).map((term) => this.#value(term, values));
        return (left === right) === sign;
      }
      case "is":
        return (
          this.#holds(
            formula[1],
            atomTerms(formula).map((term) => this.#value(term, values)),
          ) === sign
        );
      case "not":
        return this.#isTrue(formula[1], !sign, values);
      case "and":
      case "or":
        return (formula[0] === "and") === sign ? partsOf(formula).every(part) : partsOf(formula).some(part);
      case "implies":
      case "iff": {
        const [kind, left, right] = formula;
        const both = (first: boolean, second: boolean) =>
          this.#isTrue(left, first, values) && this.#isTrue(right, second, values);
        if (kind === "iff") return both(true, sign) || both(false, !sign);
        return sign ? this.#isTrue(left, false, values) || part(right) : both(true, false);
      }
      case "forall":
      case "exists": {
        const [kind, variable, body] = formula;
        const isTrueOf = (element: Element) =>
          this.#isTrue(body, sign, new Map(values).set(variable, element));
        return (kind === "forall") === sign ? this.#few.every(isTrueOf) : this.#more.some(isTrueOf);
      }
    }
  }

  #value(term: TermRecord, values: Values): Element {
    if (typeof term === "string") return values.get(term)!;
    const [symbol, ...args] = term;
    return this.#element(
      symbol,
      args.map((arg) => this.#value(arg, values)),
    );
  }

  #holds(relation: string, elements: readonly Element[]): boolean {
    const key = `${relation} ${elements.map(({ id }) => id).join()}`;
    const known = this.#facts.get(key);
    if (known !== undefined) return known;
    const { on, others, cases } = this.#record.relations[relation]!;
    const { symbol, args } = elements[on]!;
    const rest = elements.toSpliced(on, 1);
    const values = new Map([
      ...others.map((other, place) => [other, rest[place]!] as const),
      ...this.#record.constructors[symbol]!.map((arg, place) => [arg, args[place]!] as const),
    ]);
    const result = this.#isTrue(cases[symbol]!, true, values);
    this.#facts.set(key, result);
    return result;
  }
}
