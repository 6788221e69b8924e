/**
 * Checking derivations. A derivation is sound by this: take any structure in which the premises, and the negated
 * conclusion if there is one, are true. Going through the formulas in order, it is extended to new relations and
 * functions so that each formula is true and so are the clauses of its clause form; nothing that was interpreted
 * before changes, because a relation is defined before it is used and functions belong to earlier formulas. Then every
 * line is true in the extension for all values of its variables. The last line is the empty clause, which is true
 * nowhere: there is no such structure.
 *
 * Relations are told apart by name and places, functions by name and number of arguments; a function that no clause
 * form brings in may be interpreted in any way.
 */

import type { Meter } from "../logic/meter.ts";
import { clauseForm, simplifyClause } from "../logic/records/clause-form.ts";
import {
  atomOf,
  atomTerms,
  type ClauseRecord,
  changeAtom,
  changeTerms,
  type FormulaRecord,
  freeVariables,
  Growth,
  isSameTerm,
  sameUpToNames,
  substituteInClause,
  substituteInTerm,
  type TermFormulaRecord,
  type TermRecord,
  termFunctions,
  visitAtoms,
} from "../logic/records/formulas.ts";
import { miniscopeFormula, unfoldFormula } from "../logic/records/made-formulas.ts";
import { Propagation } from "../logic/records/propagation.ts";
import type { DerivationFact, LineRecord, MadeFormula } from "./format.ts";
import { reject } from "./read.ts";

/** Parts and literals of all formulas of a derivation and their clause forms. */
const LARGEST_DERIVATION = 3_000_000;

/**
 * @param sentences what the numbers of premises and conclusion stand for, closed and without functions
 * @throws Rejected when the derivation is not sound
 */
export function checkDerivation(
  fact: DerivationFact,
  sentences: readonly FormulaRecord[],
  at: string,
  meter: Meter,
): void {
  const formulas = new Formulas(new Growth(LARGEST_DERIVATION, meter));
  for (const premise of fact.premises) formulas.add(sentences[premise]!);
  if (fact.conclusion !== null) formulas.add(["not", sentences[fact.conclusion]!]);
  for (const [place, made] of fact.made.entries())
    formulas.add(formulas.make(made, `${at}, formula made ${place}`));
  const clauses: ClauseRecord[] = [];
  for (const [place, line] of fact.lines.entries())
    clauses.push(checkLine(line, clauses, formulas, `${at}, line ${place}`, meter));
  if (clauses.at(-1)?.length !== 0) reject(`${at}: the last line is not the empty clause`);
}

/** The formulas of a derivation, by number. */
class Formulas {
  readonly #growth: Growth;
  readonly #formulas: TermFormulaRecord[] = [];
  readonly #clauses: (readonly ClauseRecord[])[] = [];
  /** Names of the relations in the formulas so far. */
  readonly #relations = new Set<string>();

  constructor(growth: Growth) {
    this.#growth = growth;
  }

  add(formula: TermFormulaRecord): void {
    this.#formulas.push(formula);
    visitAtoms(formula, this.#growth, (atom) => atom[0] === "is" && this.#relations.add(atom[1]));
  }

  clause(number: number, place: number, at: string): ClauseRecord {
    this.#clauses[number] ??= clauseForm(this.#get(number, at), number, this.#growth);
    return this.#clauses[number]![place] ?? reject(`${at}: formula ${number} has no clause ${place}`);
  }

  make(made: MadeFormula, at: string): TermFormulaRecord {
    switch (made[0]) {
      case "define": {
        const [, name, parameters, body] = made;
        // The relation is interpreted by the body: so it may occur neither there nor in what is settled already.
        if (this.#relations.has(name)) reject(`${at}: ${name} occurs in a formula before its definition`);
        this.#requireEarlier(body, name, at);
        if (new Set(parameters).size !== parameters.length) reject(`${at}: a variable occurs twice`);
        const free = freeVariables(body).find((variable) => !parameters.includes(variable));
        if (free !== undefined) reject(`${at}: ${free} is free in the definition of ${name}`);
        const meaning: TermFormulaRecord = ["iff", ["is", name, ...parameters], body];
        return parameters.reduceRight<TermFormulaRecord>(
          (inner, variable) => ["forall", variable, inner],
          meaning,
        );
      }
      case "unfold":
        return this.#unfold(this.#get(made[1], at), made[2], at);
      case "fold": {
        // With the definition, the formula says what its unfolding says, and that is true already.
        const [, number, definition, formula] = made;
        if (freeVariables(formula).length > 0) reject(`${at} has a free variable`);
        this.#requireEarlier(formula, null, at);
        if (!sameUpToNames(this.#unfold(formula, definition, at), this.#get(number, at)))
          reject(`${at} does not unfold to formula ${number}`);
        return formula;
      }
      case "miniscope":
        return miniscopeFormula(this.#get(made[1], at), this.#growth);
    }
  }

  #get(number: number, at: string): TermFormulaRecord {
    return this.#formulas[number] ?? reject(`${at}: there is no formula ${number} before`);
  }

  #unfold(formula: TermFormulaRecord, definition: number, at: string): TermFormulaRecord {
    const unfolded = unfoldFormula(formula, this.#get(definition, at), this.#growth);
    return unfolded ?? reject(`${at}: formula ${definition} is not a definition`);
  }

  /** Functions of this and later formulas will be interpreted by what they say, so none may occur here. */
  #requireEarlier(formula: TermFormulaRecord, defined: string | null, at: string): void {
    visitAtoms(formula, this.#growth, (atom) => {
      if (atom[0] === "is" && atom[1] === defined) reject(`${at}: ${defined} occurs in its own definition`);
      for (const name of atomTerms(atom).flatMap(termFunctions)) {
        const number = /^(0|[1-9]\d*)\.(0|[1-9]\d*)$/.exec(name)?.[1];
        if (number === undefined || Number(number) >= this.#formulas.length)
          reject(`${at}: the function ${name} does not belong to a formula before`);
      }
    });
  }
}

/** The clause that a line derives from the clauses of the lines before it. */
function checkLine(
  line: LineRecord,
  before: readonly ClauseRecord[],
  formulas: Formulas,
  at: string,
  meter: Meter,
): ClauseRecord {
  if (line[0] === "clause") return formulas.clause(line[1], line[2], at);
  const [, clause, uses] = line;
  if (uses === undefined) {
    if (!isTrueByIdentity(clause, new Growth(undefined, meter)))
      reject(`${at} is not true by the laws of identity`);
    return clause;
  }
  // Variables of the clause and of instances stand for elements, the same in all of them: what follows for each choice
  // of them follows for all. Atoms get numbers, equal ones the same, and s = t another than t = s.
  const numbers = new Map<string, number>();
  const numbered = (literals: ClauseRecord) =>
    literals.map((literal) => {
      const atom = atomOf(literal);
      const key = JSON.stringify(atom);
      const number = numbers.get(key) ?? numbers.size + 1;
      numbers.set(key, number);
      return literal === atom ? number : -number;
    });
  const propagation = new Propagation(meter);
  for (const [number, terms] of uses) {
    const used = before[number] ?? reject(`${at}: there is no line ${number} before`);
    const growth = new Growth(undefined, meter);
    propagation.add(numbered(substituteInClause(used, new Map(Object.entries(terms)), growth)));
  }
  if (!propagation.follows(numbered(clause))) reject(`${at} does not follow from the lines it names`);
  return clause;
}

/**
 * s ≠ t ∨ φ says the same as s ≠ t ∨ φ′, where t stands in φ′ in place of s. So the literals are changed one after
 * another, and what comes out true for all values was true.
 */
function isTrueByIdentity(clause: ClauseRecord, growth: Growth): boolean {
  let literals: ClauseRecord = clause;
  for (let place = 0; place < clause.length; place += 1) {
    const literal = literals[place]!;
    if (literal[0] !== "not" || literal[1][0] !== "=") continue;
    const [, from, to] = literal[1];
    const replace = (term: TermRecord): TermRecord => {
      if (isSameTerm(term, from, growth)) return substituteInTerm(to, new Map(), growth);
      if (typeof term === "string") return term;
      const [name, ...args] = term;
      return [name, ...args.map(replace)];
    };
    literals = literals.map((other, index) =>
      index === place ? other : changeAtom(other, (atom) => changeTerms(atom, replace)),
    );
  }
  return simplifyClause(literals) === null;
}
