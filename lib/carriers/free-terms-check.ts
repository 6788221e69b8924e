/**
 * Certificates of sentences about free terms (`free-terms.ts`), followed step by step. Nothing is searched.
 *
 * What is to be refuted is kept in negation normal form, a tree of ∧ and ∨ over literals and quantified formulas, with
 * parameters for elements that it may choose: it is refuted when no choice of ground terms makes it true.
 *
 * Why that is sound. Nothing in the tree is negated but atoms, so that the whole stays true when a part gives way to one
 * that is true where the part was. An ∃ outside of other quantifiers that is true is so of some element: the new
 * parameter. A ∀ that is true is so of every term. Every ground term has a constructor in front, so that a formula that no
 * such form of a parameter makes true is never true; and if it is true with some term, it is with one of least depth for
 * the same values of the other parameters, hence not with its arguments. At the end, when the ∀ that are left are taken
 * as true:
 * - an equation of two terms gives way to equations of a parameter and a term, by the axioms of locally free algebras
 *   (Mal'cev 1961), and a relation at a term with a constructor to what its definition says;
 * - an atom is taken to be true, then to be false; when an equation of a parameter and a term is taken to be true, the
 *   term takes the place of the parameter, so that equal things are written alike;
 * - where only literals are left, they may contradict each other by descent: when a relation "goes down" at a place, it
 *   holds only where the term there is a proper part of the one that the recursion is on, and proper parts do not go
 *   round in a circle.
 */
import type { Meter } from "../logic/meter.ts";
import {
  type AtomRecord,
  atomOf,
  atomTerms,
  type FormulaRecord,
  FormulaTooLarge,
  freeVariables,
  Growth,
  isSameTerm,
  type LiteralRecord,
  partsOf,
  substitute,
  type TermFormulaRecord,
  type TermRecord,
  termVariables,
  visitAtoms,
  withParts,
} from "../logic/records/formulas.ts";
import { junction, negationNormalForm } from "../logic/records/made-formulas.ts";
import { type CertificateRecord, DEEPEST_TERMS, isTerm, type TermsRecord } from "./free-terms.ts";

/** Parts of formulas that are made in following one certificate at most. */
const MOST_PARTS = 1_000_000;

/** Atoms that are taken to be true or false, by their JSON text. */
type Known = ReadonlyMap<string, LiteralRecord>;
const NOTHING: Known = new Map();

/** What is to be refuted. */
export interface Claim {
  /** Without ∃ outside of other quantifiers; simplified. */
  readonly formula: TermFormulaRecord;
  /** How many parameters have come in. */
  readonly parameters: number;
}

/**
 * Whether a certificate shows that a sentence is true in a structure of free terms.
 * @param record as `readTerms` accepts it
 * @param sentence closed, without functions; of relations that the record does not have, nothing is true
 * @param certificate as `readCertificate` accepts it for the record
 * @param meter counts a thousandth of a step for each part of a formula that is looked at
 * @throws WorkEnded when the meter's budget ends or the user interrupts
 */
export function checkCertificate(
  record: TermsRecord,
  sentence: FormulaRecord,
  certificate: CertificateRecord,
  meter: Meter,
): boolean {
  const growth = new Growth(MOST_PARTS, meter);
  try {
    const terms = new FreeTerms(record, growth);
    return terms.interprets(sentence) && follows(terms.negation(sentence), certificate);

    function follows(start: Claim, steps: CertificateRecord): boolean {
      let claim = start;
      for (const step of steps) {
        if (claim.formula[0] === "false") return true;
        if (step[0] !== "instances") {
          const branches = terms.branches(claim, step[1], step[0] === "induction");
          return branches?.every(([symbol, branch]) => follows(branch, step[2][symbol]!)) ?? false;
        }
        const [, ...instances] = step;
        const next = terms.instances(claim, instances);
        if (next === null) return false;
        claim = next;
      }
      return terms.isRefuted(claim);
    }
  } catch (problem) {
    if (problem instanceof FormulaTooLarge) return false;
    throw problem;
  }
}

/** The steps of certificates, for one structure. */
export class FreeTerms {
  readonly #record: TermsRecord;
  readonly #growth: Growth;
  /** By relation, place and whether it holds there or fails, what {@link #goesDown} found. */
  readonly #goingDown = new Map<string, boolean>();

  /** @param growth counts all parts of formulas that are looked at */
  constructor(record: TermsRecord, growth: Growth) {
    this.#record = record;
    this.#growth = growth;
  }

  /** Whether a formula is closed and about relations of the record. */
  interprets(formula: FormulaRecord): boolean {
    const { relations } = this.#record;
    let isKnown = freeVariables(formula).length === 0;
    visitAtoms(formula, this.#growth, (atom) => {
      const isRelation = atom[0] === "=" || Object.hasOwn(relations, atom[1]);
      if (!isRelation) isKnown = false;
      else if (atom[0] === "is" && atom.length !== relations[atom[1]]!.others.length + 3) isKnown = false;
    });
    return isKnown;
  }

  /** What is to be refuted so that a sentence is true. */
  negation(sentence: FormulaRecord): Claim {
    return this.#claim(negationNormalForm(sentence, false, this.#growth), 0);
  }

  /** The claim with instances of its first ∀ in place of that; null when it has none, or at terms that are not of it. */
  instances({ formula, parameters }: Claim, terms: readonly TermRecord[]): Claim | null {
    const isParameter = (name: string) => isParameterOf(name, parameters);
    if (!terms.every((term) => isTerm(term, this.#record, isParameter))) return null;
    const next = this.#instantiate(formula, terms);
    return next === null ? null : this.#claim(next, parameters);
  }

  /** The claim for each constructor in front of a parameter; null when that is not one of its parameters. */
  branches(
    { formula, parameters }: Claim,
    parameter: string,
    isInductive: boolean,
  ): readonly (readonly [string, Claim])[] | null {
    if (!isParameterOf(parameter, parameters)) return null;
    const at = (term: TermRecord) => substitute(formula, new Map([[parameter, term]]), this.#growth);
    return Object.entries(this.#record.constructors).map(([symbol, { length }]) => {
      const args = Array.from({ length }, (_, place) => `${parameters + 1 + place}`);
      const smaller = isInductive ? args.map((arg) => negationNormalForm(at(arg), false, this.#growth)) : [];
      return [symbol, this.#claim(["and", at([symbol, ...args]), ...smaller], parameters + length)];
    });
  }

  /** Whether a claim is seen to be false whatever its parameters are. */
  isRefuted({ formula }: Claim): boolean {
    let rest = formula;
    for (let next = this.#instantiate(rest, []); next !== null; next = this.#instantiate(rest, []))
      rest = next;
    return this.#isRefuted(this.#simplify(rest), NOTHING);
  }

  #claim(formula: TermFormulaRecord, parameters: number): Claim {
    let count = parameters;
    const open = (part: TermFormulaRecord): TermFormulaRecord => {
      if (part[0] === "and" || part[0] === "or") return withParts(part, partsOf(part).map(open));
      if (part[0] !== "exists") return part;
      count += 1;
      return open(substitute(part[2], new Map([[part[1], `${count}`]]), this.#growth));
    };
    return { formula: this.#simplify(open(formula)), parameters: count };
  }

  #instantiate(formula: TermFormulaRecord, terms: readonly TermRecord[]): TermFormulaRecord | null {
    this.#growth.add();
    if (formula[0] === "forall") {
      const [, variable, body] = formula;
      return ["and", ...terms.map((term) => substitute(body, new Map([[variable, term]]), this.#growth))];
    }
    if (formula[0] !== "and" && formula[0] !== "or") return null;
    const parts = partsOf(formula);
    for (const [place, part] of parts.entries()) {
      const next = this.#instantiate(part, terms);
      if (next !== null) return withParts(formula, parts.with(place, next));
    }
    return null;
  }

  /** Whether no values of the parameters make a formula without quantifiers, and all that is known, true. */
  #isRefuted(formula: TermFormulaRecord, known: Known): boolean {
    this.#growth.add(1 + known.size);
    if (formula[0] === "false") return true;
    if (formula[0] === "true") return this.#isCircular(known);
    const atom = this.#nextAtom(formula);
    const suppose = (literal: LiteralRecord) => {
      const more = addTo(known, literal);
      return this.#isRefuted(this.#simplify(formula, more), more);
    };
    if (!suppose(["not", atom])) return false;
    if (atom[0] === "is") return suppose(atom);
    const [, parameter, term] = atom;
    const all = substitute(
      ["and", formula, ...known.values()],
      new Map([[parameter as string, term]]),
      this.#growth,
    );
    return this.#isRefuted(this.#simplify(all), NOTHING);
  }

  /** The atom of a simplified formula to decide next: of a literal that must be true, or else an equation, or any. */
  #nextAtom(formula: TermFormulaRecord): AtomRecord {
    const atoms: AtomRecord[] = [];
    for (const part of formula[0] === "and" ? partsOf(formula) : [formula]) {
      if (part[0] === "is" || part[0] === "=" || part[0] === "not") return atomOf(part as LiteralRecord);
      visitAtoms(part, this.#growth, (atom) => atoms.push(atom));
    }
    return atoms.find((atom) => atom[0] === "=") ?? atoms[0]!;
  }

  /**
   * The formula, in negation normal form, with all that can be unfolded unfolded, known atoms and ⊤ and ⊥ gone: its
   * equations are of a variable and a term without it, at the places of recursion stand variables.
   */
  #simplify(formula: TermFormulaRecord, known: Known = NOTHING, depth = 0): TermFormulaRecord {
    this.#growth.add();
    if (depth > DEEPEST_TERMS * 5) throw new FormulaTooLarge();
    const parts = () => partsOf(formula).map((part) => this.#simplify(part, known, depth + 1));
    switch (formula[0]) {
      case "and":
      case "or":
        return junction(formula[0], parts());
      case "forall":
      case "exists": {
        const [body] = parts();
        return body![0] === "true" || body![0] === "false" ? body! : withParts(formula, [body!]);
      }
      case "is":
      case "=":
      case "not":
        return this.#simplifyLiteral(formula as LiteralRecord, known, depth);
      default:
        return formula;
    }
  }

  #simplifyLiteral(literal: LiteralRecord, known: Known, depth: number): TermFormulaRecord {
    const atom = atomOf(literal);
    const isPositive = literal[0] !== "not";
    if (atom[0] === "=") {
      const equations = this.#equations(atom[1], atom[2], depth);
      if (equations === null) return [isPositive ? "false" : "true"];
      const all = equations.map((one) => settled(isPositive ? one : ["not", one], known));
      return junction(isPositive ? "and" : "or", all);
    }
    const [, name, ...args] = atom;
    const { on, others, cases } = this.#record.relations[name]!;
    const term = args[on]!;
    if (typeof term === "string") return settled(literal, known);
    const [symbol, ...inner] = term;
    const values = new Map([
      ...others.map((other, place) => [other, args[place < on ? place : place + 1]!] as const),
      ...this.#record.constructors[symbol]!.map((arg, place) => [arg, inner[place]!] as const),
    ]);
    const body = substitute(cases[symbol]!, values, this.#growth);
    return this.#simplify(negationNormalForm(body, isPositive, this.#growth), known, depth + 1);
  }

  /** Equations of a variable and a term that say together that two terms are the same; null when they never are. */
  #equations(left: TermRecord, right: TermRecord, depth: number): readonly AtomRecord[] | null {
    this.#growth.add();
    if (depth > DEEPEST_TERMS * 5) throw new FormulaTooLarge();
    if (typeof left !== "string" && typeof right !== "string") {
      if (left[0] !== right[0]) return null;
      const all: AtomRecord[] = [];
      for (let place = 1; place < left.length; place += 1) {
        const some = this.#equations(left[place]!, right[place]!, depth + 1);
        if (some === null) return null;
        for (const one of some) all.push(one);
      }
      return all;
    }
    if (isSameTerm(left, right, this.#growth)) return [];
    // Two variables in a fixed order, so that an equation is written in one way.
    const isTurned = typeof left !== "string" || (typeof right === "string" && right < left);
    const [variable, term] = (isTurned ? [right, left] : [left, right]) as [string, TermRecord];
    return termVariables(term).includes(variable) ? null : [["=", variable, term]];
  }

  /** Whether literals would have a parameter be a proper part of itself, by relations that go down. */
  #isCircular(literals: Known): boolean {
    let below: (readonly [string, string])[] = [];
    for (const literal of literals.values()) {
      const atom = atomOf(literal);
      if (atom[0] === "=") continue;
      const { on } = this.#record.relations[atom[1]]!;
      const terms = atomTerms(atom);
      for (const [place, term] of terms.entries())
        if (place !== on && this.#goesDown(atom[1], place, literal[0] !== "not"))
          below.push(...termVariables(term).map((part) => [part, terms[on] as string] as const));
    }
    // What has nothing below itself is in no circle.
    for (let count = -1; count !== below.length; ) {
      count = below.length;
      const above = new Set(below.map(([, whole]) => whole));
      this.#growth.add(1 + count);
      below = below.filter(([part]) => above.has(part));
    }
    return below.length > 0;
  }

  /**
   * Whether a relation holds (or, if `isPositive` is false, fails) only where the term at a place is a proper part of the
   * one that the recursion is on. By induction on that one: if the term is none of its arguments and, as is known of
   * them, related to none of them, then what the definition says is refuted.
   */
  #goesDown(name: string, place: number, isPositive: boolean): boolean {
    const key = JSON.stringify([name, place, isPositive]);
    const found = this.#goingDown.get(key);
    if (found !== undefined) return found;
    // Nothing may rest on it before it is shown.
    this.#goingDown.set(key, false);
    const { on, others, cases } = this.#record.relations[name]!;
    const other = others[place < on ? place : place - 1]!;
    const isDown = Object.entries(this.#record.constructors).every(([symbol, args]) => {
      const body = this.#simplify(negationNormalForm(cases[symbol]!, isPositive, this.#growth));
      let known = NOTHING;
      visitAtoms(body, this.#growth, (atom) => {
        const terms = atomTerms(atom);
        const isEquation = atom[0] === "=";
        const meansDown = isEquation
          ? terms.includes(other) && terms.some((term) => args.includes(term as string))
          : atom[1] === name && terms[place] === other;
        if (meansDown) known = addTo(known, isEquation || isPositive ? ["not", atom] : atom);
      });
      return this.#isRefuted(this.#simplify(body, known), known);
    });
    this.#goingDown.set(key, isDown);
    return isDown;
  }
}

function isParameterOf(name: string, parameters: number): boolean {
  const number = Number(name);
  return `${number}` === name && Number.isInteger(number) && number >= 1 && number <= parameters;
}

function addTo(known: Known, literal: LiteralRecord): Known {
  return new Map(known).set(JSON.stringify(atomOf(literal)), literal);
}

/** The literal, or ⊤ or ⊥ where its atom is known. */
function settled(literal: LiteralRecord, known: Known): TermFormulaRecord {
  const taken = known.size === 0 ? undefined : known.get(JSON.stringify(atomOf(literal)));
  if (taken === undefined) return literal;
  return [(taken[0] === "not") === (literal[0] === "not") ? "true" : "false"];
}
