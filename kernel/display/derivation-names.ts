/**
 * Names for what a derivation brings in, and its formulas and terms as they are printed. Elements that an ∃ promises
 * are called a, b, c, …, or f(x), g(x), … where they depend on others; relations that were defined on the way D, E, …
 */

import type {
  AtomRecord,
  ClauseRecord,
  LiteralRecord,
  TermFormulaRecord,
  TermRecord,
} from "../../lib/evidence/format.ts";
import type { FunctionSymbol, Term, TermFormula } from "../../lib/logic/clausal.ts";
import { type Formula, type RelationSymbol, relationsOf, variablesOf } from "../../lib/logic/formula.ts";
import { atomOf, atomTerms, Growth, partsOf, termVariables } from "../../lib/logic/records/formulas.ts";
import { negationNormalForm } from "../../lib/logic/records/made-formulas.ts";
import { isNegated } from "./derivation-propagation.ts";

/** Variables in the order in which they are taken. */
export const VARIABLES = ["x", "y", "z", "u", "v", "w"];
const MORE_VARIABLES = [...VARIABLES, "t", "s", "r"];
const PLAIN = /^[a-z]$/;
const CONSTANTS = ["a", "b", "c", "d", "e", "k", "m", "n", "p", "q", "r", "s", "t"];
const FUNCTIONS = ["f", "g", "h"];
const RELATIONS = ["D", "E", "F", "G", "H", "J", "K", "L"];

/** How the variables of one clause are called where it is shown. */
export type Renaming = ReadonlyMap<string, string>;

/** What is known of a function of a clause form. */
export interface FunctionOrigin {
  /** Formula and place, as in the function's name in the evidence. */
  readonly formula: number;
  /** The variable of the quantifier that it comes from. */
  readonly variable: string;
}

/** The names of one derivation; they depend on the order in which they are first asked for. */
export class DerivationNames {
  readonly #relations = new Map<string, RelationSymbol>();
  readonly #functions = new Map<string, FunctionSymbol>();
  readonly #taken: Set<string>;
  readonly #formulas: readonly TermFormulaRecord[];
  readonly #origins = new Map<number, readonly string[]>();
  /** For variables that came in when formulas were made of others, mostly primed ones, letters that are free. */
  readonly plain: Renaming;

  /**
   * @param sentences the premises and the conclusion, as the user has them
   * @param formulas all formulas of the derivation, by number
   */
  constructor(sentences: readonly Formula[], formulas: readonly TermFormulaRecord[]) {
    this.#formulas = formulas;
    this.#taken = new Set([...VARIABLES, ...sentences.flatMap((sentence) => [...variablesOf(sentence)])]);
    for (const relation of sentences.flatMap((sentence) => [...relationsOf(sentence)])) {
      this.#relations.set(relation.name, relation);
      this.#taken.add(relation.name);
    }
    this.plain = this.#letters(new Set(sentences.flatMap((sentence) => [...variablesOf(sentence)])));
  }

  #letters(own: Set<string>): Renaming {
    const letters = new Map<string, string>();
    for (const name of new Set(this.#formulas.flatMap(variableNames))) {
      if (own.has(name)) continue;
      const letter = PLAIN.test(name) ? name : MORE_VARIABLES.find((one) => !own.has(one));
      if (letter === undefined) continue;
      own.add(letter);
      this.#taken.add(letter);
      letters.set(name, letter);
    }
    return letters;
  }

  /** The name by which a relation that was defined on the way is shown. */
  relation(name: string, places: number): RelationSymbol {
    let relation = this.#relations.get(name);
    if (relation === undefined) {
      relation = { name: this.#choose(RELATIONS), places, infix: false };
      this.#relations.set(name, relation);
    }
    return relation;
  }

  /** What an evidence's function, `"2.0"`, stands for. */
  originOf(name: string): FunctionOrigin {
    const [formula, place] = name.split(".").map(Number) as [number, number];
    let origins = this.#origins.get(formula);
    if (origins === undefined) {
      origins = chosenVariables(this.#formulas[formula]!);
      this.#origins.set(formula, origins);
    }
    return { formula, variable: origins[place]! };
  }

  term(term: TermRecord, renaming: Renaming): Term {
    if (typeof term === "string") return renaming.get(term) ?? term;
    const [name, ...args] = term;
    const symbol = this.#functions.get(name) ?? this.#nameFunction(name, args.length);
    // A constant is printed as a variable is, so that atoms with it are set as the user's are.
    return args.length === 0 ? symbol.name : { symbol, args: args.map((arg) => this.term(arg, renaming)) };
  }

  #nameFunction(name: string, places: number): FunctionSymbol {
    const { formula, variable } = this.originOf(name);
    const symbol: FunctionSymbol = {
      name: this.#choose(places === 0 ? CONSTANTS : FUNCTIONS),
      places,
      origin: { kind: "skolem", variable, formula: this.formula(this.#formulas[formula]!), parameters: [] },
    };
    this.#functions.set(name, symbol);
    return symbol;
  }

  #choose(from: readonly string[]): string {
    for (let round = 0; ; round += 1)
      for (const letter of from) {
        const name = round === 0 ? letter : `${letter}${round}`;
        if (this.#taken.has(name)) continue;
        this.#taken.add(name);
        return name;
      }
  }

  /** Names for variables in order, other than those that are in use in the line already. */
  *variables(used: ReadonlySet<string>): Generator<string, never> {
    for (let round = 0; ; round += 1)
      for (const letter of VARIABLES) {
        const name = round === 0 ? letter : `${letter}${round}`;
        if (!used.has(name) && !(round > 0 && this.#taken.has(name))) yield name;
      }
  }

  atom(atom: AtomRecord, renaming: Renaming): TermFormula {
    if (atom[0] === "=")
      return { kind: "equal", left: this.term(atom[1], renaming), right: this.term(atom[2], renaming) };
    const [, name, ...terms] = atom;
    const args = terms.map((term) => this.term(term, renaming));
    return { kind: "atom", relation: this.relation(name, args.length), args };
  }

  formula(formula: TermFormulaRecord): TermFormula {
    switch (formula[0]) {
      case "is":
      case "=":
        return this.atom(formula, this.plain);
      case "true":
      case "false":
        return { kind: formula[0] };
      case "not":
        return { kind: "not", body: this.formula(formula[1]) };
      case "and":
      case "or": {
        const [kind, ...parts] = formula;
        return { kind, parts: parts.map((part) => this.formula(part)) };
      }
      case "implies":
      case "iff":
        return { kind: formula[0], left: this.formula(formula[1]), right: this.formula(formula[2]) };
      case "forall":
      case "exists":
        return {
          kind: formula[0],
          variable: this.plain.get(formula[1]) ?? formula[1],
          body: this.formula(formula[2]),
        };
    }
  }

  literal(literal: LiteralRecord, renaming: Renaming): TermFormula {
    const atom = this.atom(atomOf(literal), renaming);
    return isNegated(literal) ? { kind: "not", body: atom } : atom;
  }

  /**
   * A clause as it reads best: an implication, a disjunction, or that some things are not so together. Several with the
   * same conditions, each with one result, become one statement.
   */
  statement(clauses: readonly ClauseRecord[], renaming: Renaming): TermFormula {
    const implications = clauses.map(implicationOf);
    const conditions = join(
      "and",
      implications[0]!.conditions.map((atom) => this.atom(atom, renaming)),
    );
    const results = implications.flatMap((one) =>
      one.results.map((literal) => this.literal(literal, renaming)),
    );
    if (results.length === 0) return { kind: "not", body: conditions };
    const result = join(clauses.length === 1 ? "or" : "and", results);
    return implications[0]!.conditions.length === 0
      ? result
      : { kind: "implies", left: conditions, right: result };
  }
}

/** A clause as a statement that some things together have one of some results. */
export interface Implication {
  readonly conditions: readonly AtomRecord[];
  readonly results: readonly LiteralRecord[];
}

export function implicationOf(clause: ClauseRecord): Implication {
  const positive = clause.filter((literal) => !isNegated(literal));
  const negative = clause.filter(isNegated);
  const split = (results: readonly LiteralRecord[]): Implication => ({
    conditions: clause.filter((literal) => !results.includes(literal)).map(atomOf),
    results,
  });
  if (positive.length > 0) return split(positive);
  if (negative.length === 1) return split(negative);
  // Rxy → x ≠ y reads better than ¬(Rxy ∧ x = y).
  const unequal = negative.filter((literal) => atomOf(literal)[0] === "=");
  return split(unequal.length === 1 ? unequal : []);
}

function join(kind: "and" | "or", parts: readonly TermFormula[]): TermFormula {
  return parts.length === 1 ? parts[0]! : parts.length === 0 ? { kind: "false" } : { kind, parts };
}

/**
 * For each function of a clause form, the variable that it stands for: `clauseForm` numbers the ∃ of the negation
 * normal form in the order in which they are written.
 */
function chosenVariables(formula: TermFormulaRecord): readonly string[] {
  const within = (part: TermFormulaRecord): readonly string[] => [
    ...(part[0] === "exists" ? [part[1]] : []),
    ...partsOf(part).flatMap(within),
  ];
  return within(negationNormalForm(formula, true, new Growth()));
}

/** The functions in a term, each once, in the order they occur. */
export function functionsOfTerm(term: TermRecord): readonly (readonly [string, ...TermRecord[]])[] {
  return typeof term === "string" ? [] : [term, ...term.slice(1).flatMap((arg) => functionsOfTerm(arg))];
}

/** The terms in a formula. */
export function termsOfFormula(formula: TermFormulaRecord): readonly TermRecord[] {
  return formula[0] === "is" || formula[0] === "="
    ? atomTerms(formula)
    : partsOf(formula).flatMap(termsOfFormula);
}

/** All variables that are written in a formula, bound ones that are not used as well. */
export function variableNames(formula: TermFormulaRecord): readonly string[] {
  if (formula[0] === "is" || formula[0] === "=") return atomTerms(formula).flatMap(termVariables);
  const within = partsOf(formula).flatMap(variableNames);
  return formula[0] === "forall" || formula[0] === "exists" ? [formula[1], ...within] : within;
}
