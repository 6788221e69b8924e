/**
 * A derivation as lines to read: first the sentences that it starts from, then what is read off from them with names
 * for the elements that they promise, then what follows, down to a contradiction. Each line says what the evidence
 * says at that place; only names and the grouping are made here.
 */

import type {
  ClauseRecord,
  DerivationFact,
  TermFormulaRecord,
  TermRecord,
} from "../../lib/evidence/format.ts";
import type { ShownDerivation } from "../../lib/inquiry/answer.ts";
import type { Term, TermFormula } from "../../lib/logic/clausal.ts";
import { clauseForm } from "../../lib/logic/records/clause-form.ts";
import { atomOf, atomTerms, recordFormula } from "../../lib/logic/records/formulas.ts";
import { miniscopeFormula, unfoldFormula } from "../../lib/logic/records/made-formulas.ts";
import {
  DerivationNames,
  functionsOfTerm,
  implicationOf,
  type Renaming,
  termsOfFormula,
  VARIABLES,
  variableNames,
} from "./derivation-names.ts";
import { atomKey, isNegated } from "./derivation-propagation.ts";
import { instanceOf, type Step, type Steps, stepsOf, type Use, variablesOf } from "./derivation-steps.ts";

/** The number of a line, from 1. */
export type LineNumber = number;

export interface ReadingLine {
  /** Null for the contradiction. Its free variables stand for all elements. */
  readonly sentence: TermFormula | null;
  readonly reason: Reason;
  /** Names that occur here for the first time. */
  readonly introduced: readonly Introduction[];
}

export type Reason =
  | { readonly kind: "axiom"; readonly label: string }
  /** The negated conclusion. */
  | { readonly kind: "supposition" }
  /** Says what a relation that was made on the way stands for. */
  | { readonly kind: "definition"; readonly name: string }
  /** The quantifiers moved inside. */
  | { readonly kind: "inside"; readonly from: LineNumber }
  /** A line with a relation, of this name, replaced by what the line `by` says that it means, or the other way round. */
  | {
      readonly kind: "written-out" | "abbreviated";
      readonly from: LineNumber;
      readonly by: LineNumber;
      readonly name: string;
    }
  | { readonly kind: "read-off"; readonly from: LineNumber }
  | Inference;

export interface Inference {
  readonly kind: "inference";
  readonly cited: readonly Citation[];
  /** Equations by which terms of the cited lines were exchanged. */
  readonly since: readonly { readonly equation: TermFormula; readonly line: LineNumber }[];
  /** Whether the laws of identity were used otherwise. */
  readonly byIdentity: boolean;
}

export interface Citation {
  readonly line: LineNumber;
  /** What stands for variables of that line; those that stay as they are left out. */
  readonly values: readonly { readonly variable: string; readonly value: Term }[];
}

export interface Introduction {
  /** A constant, or a function of variables of the line. */
  readonly term: Term;
  readonly parameters: readonly string[];
  /** The variable of the ∃ that promises it; null where any element will do. */
  readonly variable: string | null;
}

export interface Reading {
  readonly lines: readonly ReadingLine[];
  /** Labels of the premises among the lines. */
  readonly labels: readonly string[];
  /** Whether some line has variables without a quantifier. */
  readonly isGeneral: boolean;
}

/** Clauses that a sentence may have for a reader to see each of them in it. */
const PLAIN_CLAUSES = 4;
/** Clauses that one line may join. */
const MOST_JOINED = 4;

export function readDerivation(shown: ShownDerivation): Reading {
  const formulas = formulasOf(shown);
  const steps = stepsOf(shown.fact.lines, formulas);
  return new Reader(shown, formulas, steps).read();
}

/** All formulas of the derivation, by number. */
function formulasOf({ premises, conclusion, fact }: ShownDerivation): readonly TermFormulaRecord[] {
  const formulas: TermFormulaRecord[] = premises.map(
    ({ formula }) => recordFormula(formula) as TermFormulaRecord,
  );
  if (fact.conclusion !== null) {
    if (conclusion === null) throw new Error("the derivation of a conclusion is shown without it");
    formulas.push(["not", recordFormula(conclusion) as TermFormulaRecord]);
  }
  for (const made of fact.made) formulas.push(makeFormula(made, formulas));
  return formulas;
}

function makeFormula(
  made: DerivationFact["made"][number],
  formulas: readonly TermFormulaRecord[],
): TermFormulaRecord {
  switch (made[0]) {
    case "define": {
      const [, name, parameters, body] = made;
      return parameters.reduceRight<TermFormulaRecord>(
        (inner, variable) => ["forall", variable, inner],
        ["iff", ["is", name, ...parameters], body],
      );
    }
    case "unfold": {
      const unfolded = unfoldFormula(formulas[made[1]]!, formulas[made[2]]!);
      if (unfolded === null) throw new Error(`formula ${made[2]} of a derivation defines nothing`);
      return unfolded;
    }
    case "fold":
      return made[3];
    case "miniscope":
      return miniscopeFormula(formulas[made[1]]!);
  }
}

/** Where a step of the derivation is to be read. */
interface Place {
  readonly line: LineNumber;
  readonly renaming: Renaming;
}

class Reader {
  readonly #shown: ShownDerivation;
  readonly #formulas: readonly TermFormulaRecord[];
  readonly #steps: Steps;
  readonly #names: DerivationNames;
  readonly #lines: ReadingLine[] = [];
  readonly #formulaLines = new Map<number, LineNumber>();
  readonly #places = new Map<number, Place>();
  /** Functions that have been introduced, by their names in the evidence. */
  readonly #introduced = new Set<string>();
  /** Formulas that the reader needs, by number. */
  readonly #needed = new Set<number>();
  #isGeneral = false;
  /** What the last line says, where it is an inference. */
  #last: {
    readonly clauses: readonly ClauseRecord[];
    readonly renaming: Renaming;
    readonly reason: Reason;
  } | null = null;

  constructor(shown: ShownDerivation, formulas: readonly TermFormulaRecord[], steps: Steps) {
    this.#shown = shown;
    this.#formulas = formulas;
    this.#steps = steps;
    const conclusion = shown.conclusion === null ? [] : [shown.conclusion];
    this.#names = new DerivationNames(
      [...shown.premises.map(({ formula }) => formula), ...conclusion],
      formulas,
    );
  }

  read(): Reading {
    for (const { origin } of this.#steps.values()) if (origin.kind === "clause") this.#need(origin.formula);
    const given = this.#formulas.length - this.#shown.fact.made.length;
    const needed = [...this.#needed].sort((a, b) => a - b);
    for (const formula of needed) if (formula < given) this.#addGiven(formula);
    for (const formula of needed) if (formula < given) this.#addReadings(formula);
    for (const formula of needed)
      if (formula >= given) {
        this.#addMade(formula, this.#shown.fact.made[formula - given]!);
        this.#addReadings(formula);
      }
    for (const [number, { clause, origin }] of this.#steps)
      if (origin.kind === "infer") this.#addInference(number, clause, origin.uses);
    const labels = this.#shown.premises.flatMap(({ label }, formula) =>
      this.#needed.has(formula) ? [label] : [],
    );
    return { lines: this.#lines, labels, isGeneral: this.#isGeneral };
  }

  #need(formula: number): void {
    if (this.#needed.has(formula)) return;
    this.#needed.add(formula);
    const given = this.#formulas.length - this.#shown.fact.made.length;
    const made = this.#shown.fact.made[formula - given];
    if (made === undefined || made[0] === "define") return;
    this.#need(made[1]);
    if (made[0] !== "miniscope") this.#need(made[2]);
  }

  #add(sentence: TermFormula | null, reason: Reason, introduced: readonly Introduction[] = []): LineNumber {
    return this.#lines.push({ sentence, reason, introduced });
  }

  #addGiven(formula: number): void {
    const premise = this.#shown.premises[formula];
    const sentence = this.#sentenceOf(formula);
    this.#formulaLines.set(
      formula,
      premise === undefined
        ? this.#add(sentence, { kind: "supposition" })
        : this.#add(sentence, { kind: "axiom", label: premise.label }),
    );
  }

  /** A premise as the user has it; of what is made here, ¬¬φ is shown as φ. */
  #sentenceOf(formula: number): TermFormula {
    let record = this.#formulas[formula]!;
    if (formula >= this.#shown.premises.length)
      while (record[0] === "not" && record[1][0] === "not") record = record[1][1];
    return this.#names.formula(record);
  }

  #addMade(formula: number, made: DerivationFact["made"][number]): void {
    const record = this.#formulas[formula]!;
    if (made[0] === "define") {
      const introduced = this.#introduce(termsOfFormula(record), null, this.#names.plain);
      const sentence = this.#sentenceOf(formula);
      const { name } = this.#names.relation(made[1], made[2].length);
      this.#formulaLines.set(formula, this.#add(sentence, { kind: "definition", name }, introduced));
      return;
    }
    const from = this.#formulaLines.get(made[1])!;
    if (made[0] === "miniscope") {
      const changes =
        promisesOf(record, formula) !== promisesOf(this.#formulas[made[1]]!, made[1]) &&
        this.#stepsOf(formula).some(([, { clause }]) => namesFunctionOf(clause, formula));
      this.#formulaLines.set(
        formula,
        changes ? this.#add(this.#sentenceOf(formula), { kind: "inside", from }) : from,
      );
      return;
    }
    const kind = made[0] === "unfold" ? "written-out" : "abbreviated";
    const by = this.#formulaLines.get(made[2])!;
    const name = this.#definedIn(this.#formulas[made[2]]!);
    this.#formulaLines.set(formula, this.#add(this.#sentenceOf(formula), { kind, from, by, name }));
  }

  /** The name of the relation that a definition ∀x … (d(x, …) ↔ φ) is about. */
  #definedIn(definition: TermFormulaRecord): string {
    let inner = definition;
    while (inner[0] === "forall") inner = inner[2];
    if (inner[0] !== "iff" || inner[1][0] !== "is") throw new Error("a definition of no relation");
    const [, name, ...args] = inner[1];
    return this.#names.relation(name, args.length).name;
  }

  /** The clauses of a formula that are used, in the order in which it says them. */
  #stepsOf(formula: number): readonly (readonly [number, Step])[] {
    const placeIn = ({ origin }: Step) => (origin.kind === "clause" ? origin.place : 0);
    return [...this.#steps]
      .filter(([, { origin }]) => origin.kind === "clause" && origin.formula === formula)
      .sort(([, one], [, other]) => placeIn(one) - placeIn(other));
  }

  /** What is read off from a formula, as far as it cannot be seen in it. */
  #addReadings(formula: number): void {
    const record = this.#formulas[formula]!;
    const used = this.#stepsOf(formula);
    if (used.length === 0) return;
    const from = this.#formulaLines.get(formula)!;
    const isPlain = clauseForm(record, formula).length <= PLAIN_CLAUSES;
    const apart: (readonly [number, Step])[] = [];
    for (const [number, step] of used) {
      const isSeen =
        isPlain &&
        !namesFunctionOf(step.clause, formula) &&
        variablesOf(step.clause).every(
          (variable) => this.#bindings(from, this.#names.plain.get(variable) ?? variable) === 1,
        );
      if (isSeen) this.#places.set(number, { line: from, renaming: this.#names.plain });
      else apart.push([number, step]);
    }
    for (const group of grouped(apart)) {
      const clauses = group.map(([, { clause }]) => clause);
      const variables = [...new Set(clauses.flatMap(variablesOf))];
      const own = new Set(variableNames(record));
      const renaming = variables.every((variable) => own.has(variable))
        ? this.#names.plain
        : this.#rename(variables, new Map());
      const introduced = this.#introduce(clauses.flatMap(termsOf), formula, renaming);
      if (variables.length > 0) this.#isGeneral = true;
      const line = this.#add(
        clauses[0]!.length === 0 ? null : this.#names.statement(clauses, renaming),
        { kind: "read-off", from },
        introduced,
      );
      for (const [number] of group) this.#places.set(number, { line, renaming });
    }
  }

  /** How many quantifiers of a line bind a variable. */
  #bindings(line: LineNumber, variable: string): number {
    const count = (formula: TermFormula): number => {
      switch (formula.kind) {
        case "not":
          return count(formula.body);
        case "and":
        case "or":
          return formula.parts.reduce((sum, part) => sum + count(part), 0);
        case "implies":
        case "iff":
          return count(formula.left) + count(formula.right);
        case "forall":
        case "exists":
          return count(formula.body) + (formula.variable === variable ? 1 : 0);
        default:
          return 0;
      }
    };
    return count(this.#lines[line - 1]!.sentence!);
  }

  /**
   * Introductions of the functions in some terms that have not been introduced.
   * @param formula whose ∃ promise elements here; null when none does
   */
  #introduce(
    terms: readonly TermRecord[],
    formula: number | null,
    renaming: Renaming,
  ): readonly Introduction[] {
    const fresh = new Map<string, readonly [string, ...TermRecord[]]>();
    for (const application of terms.flatMap(functionsOfTerm))
      if (!this.#introduced.has(application[0])) fresh.set(application[0], application);
    // Named in the order of their quantifiers.
    const inPlace = [...fresh.values()].sort(([a], [b]) => placeOf(a) - placeOf(b));
    return inPlace.map(([name, ...args]): Introduction => {
      this.#introduced.add(name);
      const origin = this.#names.originOf(name);
      const isPromised = origin.formula === formula;
      const own = isPromised ? args : placeholders(args.length);
      const parameters = own.map((arg) => this.#names.term(arg, renaming));
      return {
        term: this.#names.term([name, ...own], renaming),
        parameters: parameters.filter((one) => typeof one === "string"),
        variable: isPromised ? (this.#names.plain.get(origin.variable) ?? origin.variable) : null,
      };
    });
  }

  #rename(variables: readonly string[], known: ReadonlyMap<string, string>): Renaming {
    const renaming = new Map(known);
    const used = new Set(renaming.values());
    const fresh = this.#names.variables(used);
    for (const variable of variables) {
      if (renaming.has(variable)) continue;
      const name = fresh.next().value;
      used.add(name);
      renaming.set(variable, name);
    }
    return renaming;
  }

  #addInference(number: number, clause: ClauseRecord, uses: readonly Use[]): void {
    const own = variablesOf(clause);
    const renaming = this.#rename(
      [...own, ...uses.flatMap((use) => variablesOf(instanceOf(use, this.#steps)))],
      this.#inherit(own, uses),
    );
    if (own.length > 0) this.#isGeneral = true;
    const terms = [clause, ...uses.map((use) => instanceOf(use, this.#steps))].flatMap(termsOf);
    const introduced = this.#introduce(terms, null, renaming);
    const reason = this.#inference(uses, renaming);
    const joined = introduced.length === 0 ? this.#joinLast(clause, renaming, reason) : null;
    const sentence = clause.length === 0 ? null : this.#names.statement([clause], renaming);
    const line = joined ?? this.#add(sentence, reason, introduced);
    if (joined === null) this.#last = { clauses: [clause], renaming, reason };
    this.#places.set(number, { line, renaming });
  }

  /** Adds a clause to the line before, where that has the same conditions and the same reason; null elsewhere. */
  #joinLast(clause: ClauseRecord, renaming: Renaming, reason: Reason): LineNumber | null {
    const before = this.#last;
    if (before === null || JSON.stringify(before.reason) !== JSON.stringify(reason)) return null;
    const known = [...before.renaming].every(([variable, name]) => (renaming.get(variable) ?? name) === name);
    const clauses = [...before.clauses, clause];
    const all = clauses.map(implicationOf);
    const isOne = all.every(
      ({ conditions, results }) =>
        results.length === 1 && JSON.stringify(conditions) === JSON.stringify(all[0]!.conditions),
    );
    if (!known || !isOne || clauses.length > MOST_JOINED) return null;
    this.#last = { clauses, renaming: new Map([...before.renaming, ...renaming]), reason };
    const sentence = this.#names.statement(clauses, this.#last.renaming);
    this.#lines[this.#lines.length - 1] = { ...this.#lines.at(-1)!, sentence };
    return this.#lines.length;
  }

  /** Names of variables that come from cited lines unchanged. */
  #inherit(own: readonly string[], uses: readonly Use[]): Renaming {
    const renaming = new Map<string, string>();
    const names = new Set<string>();
    for (const { step, terms } of uses) {
      const place = this.#places.get(step);
      if (place === undefined) continue;
      for (const variable of variablesOf(this.#steps.get(step)!.clause)) {
        const value = terms.get(variable) ?? variable;
        const name = place.renaming.get(variable) ?? variable;
        if (typeof value !== "string" || !own.includes(value) || renaming.has(value) || names.has(name))
          continue;
        renaming.set(value, name);
        names.add(name);
      }
    }
    return renaming;
  }

  #inference(uses: readonly Use[], renaming: Renaming): Inference {
    const laws = uses.filter(({ step }) => this.#steps.get(step)!.origin.kind === "identity");
    const others = uses.filter((use) => !laws.includes(use));
    const exchanged = new Set(
      laws
        .flatMap((use) => instanceOf(use, this.#steps))
        .filter((literal) => isNegated(literal) && atomOf(literal)[0] === "=")
        .map(atomKey),
    );
    const isEquation = (use: Use) => {
      const [literal, ...rest] = instanceOf(use, this.#steps);
      return (
        literal !== undefined && rest.length === 0 && !isNegated(literal) && exchanged.has(atomKey(literal))
      );
    };
    const equations = others.filter(isEquation);
    const isExchange = equations.length > 0 && equations.length < others.length;
    const cited = isExchange ? others.filter((use) => !isEquation(use)) : others;
    return {
      kind: "inference",
      cited: citationsOf(cited.map((use) => this.#cite(use, renaming))),
      since: isExchange
        ? equations.map((use) => ({
            equation: this.#names.statement([instanceOf(use, this.#steps)], renaming),
            line: this.#places.get(use.step)!.line,
          }))
        : [],
      byIdentity: laws.length > 0 && !isExchange,
    };
  }

  /** What stands for each variable of a cited line. */
  #cite({ step, terms }: Use, renaming: Renaming): Instance {
    const place = this.#places.get(step)!;
    const values = variablesOf(this.#steps.get(step)!.clause).map((variable): [string, Term] => [
      place.renaming.get(variable) ?? variable,
      this.#names.term(terms.get(variable) ?? variable, renaming),
    ]);
    return { line: place.line, values: new Map(values) };
  }
}

/** A line with values for some of its variables. */
interface Instance {
  readonly line: LineNumber;
  readonly values: ReadonlyMap<string, Term>;
}

/** Facts first, each by line; instances of one line that agree are one citation. */
function citationsOf(instances: readonly Instance[]): readonly Citation[] {
  const joined: Instance[] = [];
  for (const one of instances) {
    const place = joined.findIndex((other) => other.line === one.line && agree(one.values, other.values));
    if (place === -1) joined.push(one);
    else joined[place] = { line: one.line, values: new Map([...joined[place]!.values, ...one.values]) };
  }
  return joined
    .map(({ line, values }): Citation => {
      const special = [...values].filter(([variable, value]) => variable !== value);
      return {
        line,
        values: special
          .sort(([a], [b]) => orderOf(a) - orderOf(b) || (a < b ? -1 : 1))
          .map(([variable, value]) => ({ variable, value })),
      };
    })
    .sort((a, b) => Number(a.values.length > 0) - Number(b.values.length > 0) || a.line - b.line);
}

function agree(left: ReadonlyMap<string, Term>, right: ReadonlyMap<string, Term>): boolean {
  return [...left].every(
    ([variable, value]) =>
      !right.has(variable) || JSON.stringify(right.get(variable)) === JSON.stringify(value),
  );
}

/** The usual order of variables. */
function orderOf(variable: string): number {
  const place = VARIABLES.indexOf(variable);
  return place === -1 ? VARIABLES.length : place;
}

/** The place of a function, `"2.0"`, in its clause form. */
function placeOf(name: string): number {
  return Number(name.slice(name.indexOf(".") + 1));
}

/**
 * Clauses with the same conditions together, each with one result; facts about named elements apart from general ones.
 */
function grouped(
  steps: readonly (readonly [number, Step])[],
): readonly (readonly (readonly [number, Step])[])[] {
  const groups = new Map<string, (readonly [number, Step])[]>();
  for (const one of steps) {
    const [number, { clause }] = one;
    const { conditions, results } = implicationOf(clause);
    const isGeneral = variablesOf(clause).length > 0;
    const key = results.length === 1 ? JSON.stringify([isGeneral, conditions]) : String(number);
    groups.set(key, [...(groups.get(key) ?? []), one]);
  }
  return [...groups.values()].flatMap((group) => {
    const parts: (readonly (readonly [number, Step])[])[] = [];
    for (let at = 0; at < group.length; at += MOST_JOINED) parts.push(group.slice(at, at + MOST_JOINED));
    return parts;
  });
}

function termsOf(clause: ClauseRecord): readonly TermRecord[] {
  return clause.flatMap((literal) => atomTerms(atomOf(literal)));
}

function namesFunctionOf(clause: ClauseRecord, formula: number): boolean {
  return termsOf(clause)
    .flatMap(functionsOfTerm)
    .some(([name]) => name.startsWith(`${formula}.`));
}

/** Which elements a formula promises, and on how many others each depends. */
function promisesOf(formula: TermFormulaRecord, number: number): string {
  const found = clauseForm(formula, number)
    .flatMap(termsOf)
    .flatMap(functionsOfTerm)
    .map(([name, ...args]) => `${name.slice(name.indexOf("."))}/${args.length}`);
  return [...new Set(found)].sort().join(" ");
}

/** Variables for a function of which nothing is known. */
function placeholders(count: number): readonly string[] {
  return Array.from({ length: count }, (_, place) => VARIABLES[place] ?? `x${place}`);
}
