/**
 * Names for what a derivation brings in, and its formulas and terms as they are printed. Elements that an ∃ promises
 * are called a, b, c, …, or f(x), g(x), … where they depend on others; relations that were defined on the way D, E, …
 */
import { atomOf } from "../../lib/evidence/clause-form.ts";
import type {
  AtomRecord,
  ClauseRecord,
  LiteralRecord,
  TermFormulaRecord,
  TermRecord,
} from "../../lib/evidence/format.ts";
import { Growth, negationNormalForm, partsOf } from "../../lib/evidence/formulas.ts";
import type { FunctionSymbol, Term, TermFormula } from "../../lib/logic/clausal.ts";
import { type Formula, type RelationSymbol, relationsOf, variablesOf } from "../../lib/logic/formula.ts";
import { isNegated } from "./derivation-steps.ts";

const VARIABLES = ["x", "y", "z", "u", "v", "w"];
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
        return this.atom(formula, new Map());
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
        return { kind: formula[0], variable: formula[1], body: this.formula(formula[2]) };
    }
  }

  literal(literal: LiteralRecord, renaming: Renaming): TermFormula {
    const atom = this.atom(atomOf(literal), renaming);
    return isNegated(literal) ? { kind: "not", body: atom } : atom;
  }

  /** A clause as it reads best: an implication, a disjunction, or that some things are not so together. */
  clause(clause: ClauseRecord, renaming: Renaming): TermFormula {
    if (clause.length === 1) return this.literal(clause[0]!, renaming);
    const atoms = (negated: boolean) =>
      clause
        .filter((literal) => isNegated(literal) === negated)
        .map((literal) => this.atom(atomOf(literal), renaming));
    const [conditions, results] = [atoms(true), atoms(false)];
    if (conditions.length === 0) return join("or", results);
    if (results.length > 0)
      return { kind: "implies", left: join("and", conditions), right: join("or", results) };
    const isEquation = (atom: TermFormula) => atom.kind === "equal";
    const equations = conditions.filter(isEquation);
    // Rxy → x ≠ y reads better than ¬(Rxy ∧ x = y).
    if (equations.length === 1)
      return {
        kind: "implies",
        left: join(
          "and",
          conditions.filter((atom) => !isEquation(atom)),
        ),
        right: { kind: "not", body: equations[0]! },
      };
    return { kind: "not", body: join("and", conditions) };
  }
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
