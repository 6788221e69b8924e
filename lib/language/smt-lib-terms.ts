/** Terms of SMT-LIB of sort Bool as formulas, with definitions unfolded and variables given names of cells. */
import {
  and,
  atom,
  equal,
  type Formula,
  iff,
  implies,
  not,
  or,
  quantify,
  type RelationSymbol,
  substitute,
  type Variable,
} from "../logic/formula.ts";
import type { Place } from "./diagnostics.ts";
import { joined } from "./join.ts";
import { nearestName } from "./nearest.ts";
import { MAX_NESTING, quote, type Reader, Unreadable } from "./reader.ts";
import type { SExpression } from "./s-expressions.ts";
import { Bindings, type Made, type Value } from "./smt-lib-bindings.ts";
import { countOf } from "./wording.ts";

interface Macro {
  readonly parameters: readonly Variable[];
  readonly body: Made;
}

type List = SExpression & { readonly kind: "list" };
type Symbol = SExpression & { readonly kind: "symbol" };

export class SmtLibTerms {
  readonly #reader: Reader;
  readonly #placeOf: (expression: SExpression) => Place;
  readonly #relations = new Map<string, RelationSymbol>();
  readonly #macros = new Map<string, Macro>();
  #bindings = new Bindings();
  /** The sort of the elements; null until it is declared. */
  sort: string | null = null;
  /** Sorts that have been reported where they were declared. */
  readonly refused = new Set<string>();

  constructor(reader: Reader, placeOf: (expression: SExpression) => Place) {
    this.#reader = reader;
    this.#placeOf = placeOf;
  }

  #fail(code: string, at: SExpression, message: string, suggestion: string | null = null): never {
    return this.#reader.fail(code, this.#placeOf(at), message, suggestion);
  }

  /** Takes in a relation; reports a symbol that is taken, and says whether it was free. */
  declare(symbol: Symbol, relation: RelationSymbol): boolean {
    if (!this.#checkFree(symbol)) return false;
    this.#relations.set(symbol.text, relation);
    return true;
  }

  #checkFree(symbol: Symbol): boolean {
    if (!this.#relations.has(symbol.text) && !this.#macros.has(symbol.text)) return true;
    this.#reader.report(
      "relation-twice",
      this.#placeOf(symbol),
      `${quote(symbol.text)} is declared twice`,
      "leave one out",
    );
    return false;
  }

  /** Reports what is not the sort of the elements. */
  checkSort(sort: SExpression): void {
    if (sort.kind === "symbol" && sort.text === this.sort) return;
    if (sort.kind === "symbol" && this.refused.has(sort.text)) throw new Unreadable(false);
    const known = this.sort === null ? "no sort is declared" : `the sort is ${quote(this.sort)}`;
    if (sort.kind === "symbol" && sort.text === "Bool")
      this.#fail(
        "smt-lib-refused",
        sort,
        "arguments and variables are elements, and `Bool` is the sort of sentences",
      );
    this.#fail(
      "smt-lib-refused",
      sort,
      `${sort.kind === "list" ? "a compound sort" : quote(sort.text)} cannot be read here: ${known}`,
      this.sort === null ? "write `(declare-sort U 0)` before it" : null,
    );
  }

  /** Reads `(define-fun D ((x U) (y U)) Bool φ)`. */
  define(command: List): void {
    const [, name, parameters, range, body] = command.items;
    if (command.items.length !== 5 || name?.kind !== "symbol" || parameters?.kind !== "list")
      this.#fail("unexpected", command, "expected `(define-fun D ((x U) (y U)) Bool φ)`");
    if (range?.kind !== "symbol" || range.text !== "Bool")
      this.#fail(
        "smt-lib-refused",
        name,
        `${quote(name.text)} is a function, and formulas here have relations alone`,
        "define a formula: its sort is `Bool`",
      );
    this.#bindings = new Bindings();
    const { variables, symbols } = this.#bind(parameters);
    const made = this.#formula(body!);
    this.#bindings.release(symbols);
    if (this.#checkFree(name)) this.#macros.set(name.text, { parameters: variables, body: made });
  }

  /** Reads a closed term of sort Bool. */
  sentence(term: SExpression): Formula {
    this.#bindings = new Bindings();
    const { formula, parts } = this.#formula(term);
    this.#reader.charge(parts, this.#placeOf(term));
    return formula;
  }

  #made(formula: Formula, at: SExpression, parts: readonly Made[]): Made {
    let size = 1;
    let nesting = 0;
    for (const part of parts) {
      size += part.parts;
      nesting = Math.max(nesting, part.nesting);
    }
    if (nesting + 1 > MAX_NESTING) this.#reader.failNested(this.#placeOf(at));
    return { kind: "formula", formula, parts: size, nesting: nesting + 1 };
  }

  #formula(term: SExpression): Made {
    const value = this.#value(term);
    if (value.kind === "formula") return value;
    return this.#fail(
      "unexpected",
      term,
      `expected a formula, found the element ${quote(term.kind === "list" ? "(…)" : term.text)}`,
    );
  }

  #element(term: SExpression): Variable {
    if (term.kind === "list" && term.items[0]?.kind === "symbol") {
      const head = term.items[0].text;
      if (!this.#relations.has(head) && !this.#macros.has(head) && !FORMERS.has(head))
        this.#fail(
          "smt-lib-refused",
          term,
          `${quote(head)} is used as a function, and formulas here have relations alone`,
        );
    }
    const value = this.#value(term);
    if (value.kind === "element") return value.variable;
    return this.#fail("unexpected", term, "expected an element, found a formula");
  }

  #value(term: SExpression): Value {
    switch (term.kind) {
      case "symbol":
        return this.#symbol(term);
      case "constant":
        return this.#fail(
          "smt-lib-refused",
          term,
          `${quote(term.text)} is a constant of another theory: there are elements and relations alone`,
        );
      case "keyword":
        return this.#fail("unexpected", term, `expected a term, found ${quote(term.text)}`);
      case "list": {
        const [head, ...rest] = term.items;
        this.#reader.enter(this.#placeOf(term));
        const value =
          head?.kind === "symbol"
            ? this.#compound(term, head, rest)
            : this.#fail(
                "unexpected",
                head ?? term,
                "expected a connective, a quantifier or a relation at the beginning of a term",
              );
        this.#reader.level -= 1;
        return value;
      }
    }
  }

  #symbol(symbol: Symbol): Value {
    const { text } = symbol;
    const bound = this.#bindings.find(text);
    if (bound !== undefined) {
      if (bound.kind === "formula") this.#reader.charge(bound.parts, this.#placeOf(symbol));
      return bound;
    }
    if (text === "true" || text === "false") return this.#made({ kind: text }, symbol, []);
    return this.#apply(symbol, symbol, []);
  }

  #compound(term: List, head: Symbol, rest: readonly SExpression[]): Value {
    if (this.#bindings.find(head.text) !== undefined)
      this.#fail("unexpected", head, `${quote(head.text)} is a variable, and has no arguments`);
    const operator = head.quoted && RESERVED_FORMERS.has(head.text) ? "" : head.text;
    switch (operator) {
      case "forall":
      case "exists":
        return this.#quantified(term, operator, rest);
      case "let":
        return this.#let(term, rest);
      case "!":
        if (rest[0] === undefined) return this.#fail("unexpected", term, "expected a term after `!`");
        return this.#value(rest[0]);
      case "=":
      case "distinct":
        return this.#compared(term, operator, rest);
      case "ite":
        return this.#ite(term, rest);
      case "not":
      case "and":
      case "or":
      case "=>":
      case "xor": {
        const least = operator === "not" || operator === "and" || operator === "or" ? 1 : 2;
        const most = operator === "not" ? 1 : Number.POSITIVE_INFINITY;
        if (rest.length < least || rest.length > most)
          this.#fail(
            "unexpected",
            term,
            `${quote(operator)} has ${countOf(rest.length, "argument")}, and needs ${least === most ? "1" : `${least} or more`}`,
          );
        return this.#connected(
          term,
          operator,
          rest.map((part) => this.#formula(part)),
        );
      }
      case "match":
      case "_":
      case "as":
        return this.#fail("smt-lib-refused", term, `${quote(operator)} cannot be read here`);
      default:
        return this.#apply(term, head, rest);
    }
  }

  #connected(term: List, operator: string, parts: readonly Made[]): Made {
    const formulas = parts.map(({ formula }) => formula);
    const [first] = formulas;
    switch (operator) {
      case "not":
        return this.#made(not(first!), term, parts);
      case "and":
        return this.#made(joined(and, formulas), term, parts);
      case "or":
        return this.#made(joined(or, formulas), term, parts);
      default: {
        // `=>` groups to the right, `xor` to the left.
        let made = operator === "=>" ? parts.at(-1)! : parts[0]!;
        const others = operator === "=>" ? parts.slice(0, -1).reverse() : parts.slice(1);
        for (const other of others)
          made =
            operator === "=>"
              ? this.#made(implies(other.formula, made.formula), term, [other, made])
              : this.#made(not(iff(made.formula, other.formula)), term, [
                  this.#made(iff(made.formula, other.formula), term, [made, other]),
                ]);
        return made;
      }
    }
  }

  /** `=` says of neighbours that they are equal, `distinct` of any two that they are not. */
  #compared(term: List, operator: "=" | "distinct", rest: readonly SExpression[]): Made {
    if (rest.length < 2)
      this.#fail(
        "unexpected",
        term,
        `${quote(operator)} has ${countOf(rest.length, "argument")}, and needs 2 or more`,
      );
    const first = this.#value(rest[0]!);
    const values = [
      first,
      ...rest
        .slice(1)
        .map(
          (part): Value =>
            first.kind === "formula"
              ? this.#formula(part)
              : { kind: "element", variable: this.#element(part) },
        ),
    ];
    const pairs: Made[] = [];
    for (let left = 0; left < values.length; left += 1)
      for (let right = left + 1; right < values.length; right += 1) {
        if (operator === "=" && right > left + 1) break;
        const [one, other] = [values[left]!, values[right]!];
        const parts = [one, other].filter((value) => value.kind === "formula");
        this.#reader.charge(2 + parts.reduce((sum, part) => sum + part.parts, 0), this.#placeOf(term));
        const formula =
          one.kind === "formula" && other.kind === "formula"
            ? iff(one.formula, other.formula)
            : equal((one as { variable: Variable }).variable, (other as { variable: Variable }).variable);
        const same = this.#made(formula, term, parts);
        pairs.push(operator === "=" ? same : this.#made(not(formula), term, [same]));
      }
    if (pairs.length === 1) return pairs[0]!;
    return this.#made(
      joined(
        and,
        pairs.map(({ formula }) => formula),
      ),
      term,
      pairs,
    );
  }

  /** `(ite φ ψ χ)` as `(φ → ψ) ∧ (¬φ → χ)`. */
  #ite(term: List, rest: readonly SExpression[]): Made {
    if (rest.length !== 3)
      this.#fail("unexpected", term, `\`ite\` has ${countOf(rest.length, "argument")}, and needs 3`);
    const condition = this.#formula(rest[0]!);
    const then = this.#value(rest[1]!);
    if (then.kind === "element")
      return this.#fail(
        "smt-lib-refused",
        term,
        "an element chosen by `ite` cannot be read here",
        "choose between sentences",
      );
    const otherwise = this.#formula(rest[2]!);
    this.#reader.charge(condition.parts, this.#placeOf(term));
    const negated = this.#made(not(condition.formula), term, [condition]);
    const sides = [
      this.#made(implies(condition.formula, then.formula), term, [condition, then]),
      this.#made(implies(negated.formula, otherwise.formula), term, [negated, otherwise]),
    ];
    return this.#made(and(...sides.map(({ formula }) => formula)), term, sides);
  }

  #quantified(term: List, kind: "forall" | "exists", rest: readonly SExpression[]): Made {
    const [list, body] = rest;
    if (rest.length !== 2 || list?.kind !== "list" || list.items.length === 0)
      this.#fail("unexpected", term, `expected \`(${kind} ((x ${this.sort ?? "U"})) φ)\``);
    const bound = this.#bind(list);
    for (const item of list.items) this.#reader.enter(this.#placeOf(item));
    let made = this.#formula(body!);
    this.#reader.level -= list.items.length;
    this.#bindings.release(bound.symbols);
    for (const variable of [...bound.variables].reverse())
      made = this.#made(quantify(kind, variable, made.formula), term, [made]);
    return made;
  }

  /** Binds the variables of `((x U) (y U))`; the caller releases the symbols. */
  #bind(list: List): { readonly variables: readonly Variable[]; readonly symbols: readonly string[] } {
    if (list.items.length > MAX_NESTING) this.#reader.failNested(this.#placeOf(list));
    const symbols = this.#distinctSymbols(list, `(x ${this.sort ?? "U"})`, (sort) => this.checkSort(sort));
    return { variables: this.#bindings.bindElements(symbols), symbols };
  }

  /** The symbols of a list of pairs, each once; `check` is given what stands beside each. */
  #distinctSymbols(list: List, form: string, check: (beside: SExpression) => void): readonly string[] {
    const symbols = new Set<string>();
    for (const item of list.items) {
      const [symbol, beside] = item.kind === "list" ? item.items : [];
      if (item.kind !== "list" || item.items.length !== 2 || symbol?.kind !== "symbol")
        this.#fail("unexpected", item, `expected \`${form}\``);
      check(beside!);
      if (symbols.has(symbol.text))
        this.#fail("variable-twice", symbol, `${quote(symbol.text)} occurs twice in one list`);
      symbols.add(symbol.text);
    }
    return [...symbols];
  }

  /** `(let ((a t) (b u)) φ)`: all terms are read outside, then bound at once. */
  #let(term: List, rest: readonly SExpression[]): Value {
    const [list, body] = rest;
    if (rest.length !== 2 || list?.kind !== "list" || list.items.length === 0)
      this.#fail("unexpected", term, "expected `(let ((a t)) φ)`");
    const values: Value[] = [];
    const symbols = this.#distinctSymbols(list, "(a t)", (bound) => values.push(this.#value(bound)));
    for (const [index, symbol] of symbols.entries()) this.#bindings.bind(symbol, values[index]!);
    const value = this.#value(body!);
    this.#bindings.release(symbols);
    return value;
  }

  #apply(term: SExpression, head: Symbol, rest: readonly SExpression[]): Made {
    const relation = this.#relations.get(head.text);
    const macro = this.#macros.get(head.text);
    if (relation === undefined && macro === undefined) return this.#failUnknown(head, rest.length > 0);
    const args = rest.map((part) => this.#element(part));
    const places = relation?.places ?? macro!.parameters.length;
    if (args.length !== places)
      this.#fail(
        "places-differ",
        term,
        `${quote(head.text)} has ${countOf(places, "place")}, and ${countOf(args.length, "argument")} ${args.length === 1 ? "is" : "are"} given`,
      );
    if (relation !== undefined) return this.#made(atom(relation, ...args), term, []);
    const { parameters, body } = macro!;
    this.#reader.charge(body.parts, this.#placeOf(term));
    const formula = substitute(
      body.formula,
      new Map(parameters.map((parameter, index) => [parameter, args[index]!])),
    );
    return { ...body, formula };
  }

  #failUnknown(head: Symbol, called: boolean): never {
    const near = nearestName(head.text, [...this.#relations.keys(), ...this.#macros.keys()]);
    return this.#fail(
      "unknown-name",
      head,
      `there is no ${called ? "relation" : "variable"} ${quote(head.text)}`,
      near !== null
        ? `write \`${near}\``
        : called
          ? "declare it: `(declare-fun R (U U) Bool)`; relations alone can be read, no arithmetic and no functions"
          : "bind it by a quantifier",
    );
  }
}

/** Reserved words that may begin a term. */
const RESERVED_FORMERS: ReadonlySet<string> = new Set("forall exists let ! match _ as".split(" "));
/** What may begin a term without being a relation. */
const FORMERS: ReadonlySet<string> = new Set([
  ...RESERVED_FORMERS,
  ..."= distinct ite not and or => xor".split(" "),
]);
