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

import {
  atomOf,
  atomTerms,
  changeAtom,
  changeTerms,
  freeVariables,
  Growth,
  partsOf,
  sameUpToNames,
  substituteInClause,
  substituteInTerm,
} from "../logic/formula-records.ts";
import { miniscopeFormula, unfoldFormula } from "../logic/made-formulas.ts";
import type { Meter } from "../logic/meter.ts";
import { clauseForm, simplifyClause } from "./clause-form.ts";
import type {
  AtomRecord,
  ClauseRecord,
  DerivationFact,
  FormulaRecord,
  LineRecord,
  MadeFormula,
  TermFormulaRecord,
  TermRecord,
} from "./format.ts";
import { Propagation } from "./propagation.ts";
import { reject } from "./read.ts";

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
  const formulas = new Formulas(meter);
  for (const premise of fact.premises) formulas.add(sentences[premise]!);
  if (fact.conclusion !== null) formulas.add(["not", sentences[fact.conclusion]!]);
  for (const [place, made] of fact.made.entries()) formulas.make(made, `${at}, formula made ${place}`);
  const clauses: ClauseRecord[] = [];
  for (const [place, line] of fact.lines.entries())
    clauses.push(checkLine(line, clauses, formulas, `${at}, line ${place}`, meter));
  if (clauses.at(-1)?.length !== 0) reject(`${at}: the last line is not the empty clause`);
}

/** Parts and literals of all formulas of a derivation and their clause forms. */
const LARGEST_DERIVATION = 3_000_000;

/** The formulas of a derivation, by number. */
class Formulas {
  readonly #growth: Growth;
  readonly #formulas: TermFormulaRecord[] = [];
  readonly #clauses: (readonly ClauseRecord[])[] = [];
  /** Names of the relations in the formulas so far. */
  readonly #relations = new Set<string>();

  constructor(meter: Meter) {
    this.#growth = new Growth(LARGEST_DERIVATION, meter);
  }

  add(formula: TermFormulaRecord): void {
    this.#formulas.push(formula);
    this.#look(formula, (atom) => {
      if (atom[0] === "is") this.#relations.add(atom[1]);
    });
  }

  get(number: number, at: string): TermFormulaRecord {
    return this.#formulas[number] ?? reject(`${at}: there is no formula ${number} before`);
  }

  clause(number: number, place: number, at: string): ClauseRecord {
    this.#clauses[number] ??= clauseForm(this.get(number, at), number, this.#growth);
    return this.#clauses[number]![place] ?? reject(`${at}: formula ${number} has no clause ${place}`);
  }

  make(made: MadeFormula, at: string): void {
    switch (made[0]) {
      case "define": {
        const [, name, parameters, body] = made;
        // The relation is interpreted by the body: so it may occur neither there nor in what is settled already.
        const use = (atom: AtomRecord) => {
          if (atom[0] === "is" && atom[1] === name) reject(`${at}: ${name} occurs in its own definition`);
        };
        if (this.#relations.has(name)) reject(`${at}: ${name} occurs in a formula before its definition`);
        this.#look(body, use);
        this.#requireEarlierFunctions(body, at);
        if (new Set(parameters).size !== parameters.length) reject(`${at}: a variable occurs twice`);
        const free = freeVariables(body).find((variable) => !parameters.includes(variable));
        if (free !== undefined) reject(`${at}: ${free} is free in the definition of ${name}`);
        this.add(
          parameters.reduceRight<TermFormulaRecord>(
            (inner, variable) => ["forall", variable, inner],
            ["iff", ["is", name, ...parameters], body],
          ),
        );
        return;
      }
      case "unfold":
        this.add(this.#unfold(this.get(made[1], at), made[2], at));
        return;
      case "fold": {
        // With the definition, the formula says what its unfolding says, and that is true already.
        const [, number, definition, formula] = made;
        if (freeVariables(formula).length > 0) reject(`${at} has a free variable`);
        this.#requireEarlierFunctions(formula, at);
        if (!sameUpToNames(this.#unfold(formula, definition, at), this.get(number, at)))
          reject(`${at} does not unfold to formula ${number}`);
        this.add(formula);
        return;
      }
      case "miniscope":
        this.add(miniscopeFormula(this.get(made[1], at), this.#growth));
    }
  }

  #unfold(formula: TermFormulaRecord, definition: number, at: string): TermFormulaRecord {
    const unfolded = unfoldFormula(formula, this.get(definition, at), this.#growth);
    return unfolded ?? reject(`${at}: formula ${definition} is not a definition`);
  }

  /** The functions of formulas to come will be interpreted by what these say, so none may occur here. */
  #requireEarlierFunctions(formula: TermFormulaRecord, at: string): void {
    const look = (term: TermRecord): void => {
      if (typeof term === "string") return;
      const [name, ...args] = term;
      const number = /^(0|[1-9]\d*)\.(0|[1-9]\d*)$/.exec(name)?.[1];
      if (number === undefined || Number(number) >= this.#formulas.length)
        reject(`${at}: the function ${name} does not belong to a formula before`);
      args.forEach(look);
    };
    this.#look(formula, (atom) => atomTerms(atom).forEach(look));
  }

  #look(formula: TermFormulaRecord, see: (atom: AtomRecord) => void): void {
    this.#growth.add();
    if (formula[0] === "is" || formula[0] === "=") see(formula);
    else for (const part of partsOf(formula)) this.#look(part, see);
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
  switch (line[0]) {
    case "clause":
      return formulas.clause(line[1], line[2], at);
    case "identity":
      if (!isTrueByIdentity(line[1], meter)) reject(`${at} is not true by the laws of identity`);
      return line[1];
    case "infer": {
      // Variables of the clause and of instances stand for elements, the same in all of them: what follows for
      // each choice of them follows for all.
      const [, clause, uses] = line;
      const literals = new Numbering();
      const propagation = new Propagation(meter);
      for (const [number, terms] of uses) {
        const used = before[number] ?? reject(`${at}: there is no line ${number} before`);
        const instance = substituteInClause(
          used,
          new Map(Object.entries(terms)),
          new Growth(undefined, meter),
        );
        propagation.add(literals.of(instance));
      }
      if (!propagation.follows(literals.of(clause))) reject(`${at} does not follow from the lines it names`);
      return clause;
    }
  }
}

/** Literals as numbers for {@link Propagation}: equal atoms get equal numbers, and s = t is not t = s. */
class Numbering {
  readonly #numbers = new Map<string, number>();

  of(clause: ClauseRecord): number[] {
    return clause.map((literal) => {
      const atom = atomOf(literal);
      const key = JSON.stringify(atom);
      const number = this.#numbers.get(key) ?? this.#numbers.size + 1;
      this.#numbers.set(key, number);
      return literal === atom ? number : -number;
    });
  }
}

/**
 * s ≠ t ∨ φ says the same as s ≠ t ∨ φ′, where t stands in φ′ in place of s. So the literals are changed one after
 * another, and what comes out true for all values was true.
 */
function isTrueByIdentity(clause: ClauseRecord, meter: Meter): boolean {
  const growth = new Growth(undefined, meter);
  let literals: ClauseRecord = clause;
  for (let place = 0; place < clause.length; place += 1) {
    const literal = literals[place]!;
    if (literal[0] !== "not" || literal[1][0] !== "=") continue;
    const [, from, to] = literal[1];
    const replace = (term: TermRecord): TermRecord => {
      if (isSame(term, from)) return substituteInTerm(to, new Map(), growth);
      return typeof term === "string"
        ? term
        : [term[0], ...term.slice(1).map((arg) => replace(arg as TermRecord))];
    };
    literals = literals.map((other, index) =>
      index === place ? other : changeAtom(other, (atom) => changeTerms(atom, replace)),
    );
  }
  return simplifyClause(literals) === null;

  function isSame(left: TermRecord, right: TermRecord): boolean {
    growth.add();
    if (typeof left === "string" || typeof right === "string") return left === right;
    return (
      left.length === right.length &&
      left[0] === right[0] &&
      left.slice(1).every((arg, place) => isSame(arg as TermRecord, right[place + 1] as TermRecord))
    );
  }
}
