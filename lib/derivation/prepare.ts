/**
 * From a task to clauses: the premises that a turn looks at and the negated conclusion, rewritten as the turn wants
 * them, and the clauses of what they have become. Every formula on the way is kept with how it was made, since a
 * derivation tells it.
 */

import type { ClauseRecord, MadeFormula, TermFormulaRecord } from "../evidence/format.ts";
import type { Formula } from "../logic/formula.ts";
import { clauseForm } from "../logic/records/clause-form.ts";
import { recordFormula } from "../logic/records/formulas.ts";
import { miniscopeFormula, unfoldFormula } from "../logic/records/made-formulas.ts";
import { condense } from "./condense.ts";
import type { DerivationTask } from "./derive.ts";
import { explicitDefinition, orderDefinitions, relationsIn } from "./explicit.ts";
import type { Substitution } from "./lines.ts";
import { type NamedPart, nameClosedParts, nameLargeParts } from "./naming.ts";
import type { ClauseTask, InputClause } from "./refutation.ts";

/** How a turn prepares its clauses. */
export interface Preparation {
  /** The premises to start from, by their places in the task, ascending. */
  readonly premises: readonly number[];
  /** Whether explicit definitions are unfolded and then left out. */
  readonly unfold: boolean;
  /** Whether quantifiers go inside as far as they can. */
  readonly miniscope: boolean;
  /** Parts of a formula get names when a disjunction in it would become more clauses than this. */
  readonly mostClauses: number;
  /**
   * Whether closed parts get names: `alone` without looking at what they say, so that all consequences of that are lost;
   * `defined` with it.
   */
  readonly letters: "none" | "alone" | "defined";
}

/** A formula that clauses may come from, and where it comes from. Formulas go by their places in a list. */
export interface PreparedFormula {
  readonly source:
    | { readonly from: "premise"; readonly place: number }
    | { readonly from: "conclusion" }
    | { readonly from: "made"; readonly made: MadeFormula };
  readonly formula: TermFormulaRecord;
  /** Whether it was made of the negated conclusion. */
  readonly goal: boolean;
}

export interface Prepared {
  /** Its clauses are condensed. */
  readonly task: ClauseTask;
  /** By input clause: what stands in the clause form, and how it was condensed; null where it is the same. */
  readonly condensed: readonly ({ readonly from: ClauseRecord; readonly terms: Substitution } | null)[];
  readonly formulas: readonly PreparedFormula[];
  /** Whether the clauses say all that the premises and the negated conclusion say, as far as models are concerned. */
  readonly isComplete: boolean;
}

/** A formula as a record that may get functions later. */
function recordOf(formula: Formula): TermFormulaRecord {
  return recordFormula(formula) as TermFormulaRecord;
}

/** The definition ∀x … (name(x, …) ↔ body) as a formula. */
export function definitionFormula(
  name: string,
  parameters: readonly string[],
  body: TermFormulaRecord,
): TermFormulaRecord {
  return parameters.reduceRight<TermFormulaRecord>(
    (inner, parameter) => ["forall", parameter, inner],
    ["iff", ["is", name, ...parameters], body],
  );
}

/** Names `d1`, `d2`, … without those that occur in a task. */
export function freshRelationNames(task: DerivationTask): () => string {
  const taken = new Set<string>();
  for (const formula of [...task.premises, ...(task.conclusion === null ? [] : [task.conclusion])])
    for (const relation of relationsIn(recordOf(formula)))
      taken.add(relation.slice(0, relation.lastIndexOf("/")));
  let count = 0;
  return () => {
    for (;;) {
      count += 1;
      const name = `d${count}`;
      if (!taken.has(name)) return name;
    }
  };
}

/**
 * The clauses of a task, prepared as a turn wants them.
 * @throws FormulaTooLarge when a formula or a clause form is too large even so
 */
export function prepare(task: DerivationTask, preparation: Preparation): Prepared {
  const preparer = new Preparer(task, preparation);
  if (preparation.unfold) preparer.unfold();
  if (preparation.miniscope) preparer.miniscope();
  if (preparation.letters !== "none") preparer.nameClosed(preparation.letters === "defined");
  else preparer.nameLarge(preparation.mostClauses);
  const clauses = preparer.clauses();
  const input = clauses.map((one) => ({
    one,
    smaller: clauses.length > MOST_CONDENSED ? null : condense(one.clause),
  }));
  return {
    task: {
      clauses: input.map(({ one, smaller }) => (smaller === null ? one : { ...one, clause: smaller.clause })),
      formulas: preparer.formulas.length,
    },
    condensed: input.map(({ one, smaller }) =>
      smaller === null ? null : { from: one.clause, terms: smaller.terms },
    ),
    formulas: preparer.formulas,
    isComplete: preparation.letters !== "alone" && preparation.premises.length === task.premises.length,
  };
}

/** More clauses than this are left as they are. */
const MOST_CONDENSED = 400;

/** A definition of a name, and which of its two directions are of use. */
interface LiveDefinition {
  readonly number: number;
  readonly name: string;
  readonly positive: boolean;
  readonly negative: boolean;
}

class Preparer {
  readonly formulas: PreparedFormula[] = [];
  /** The formulas whose clauses are to be taken. */
  #live: number[] = [];
  /** The definitions whose clauses are to be taken. */
  readonly #definitions: LiveDefinition[] = [];
  readonly #freshName: () => string;

  constructor(task: DerivationTask, { premises }: Preparation) {
    this.#freshName = freshRelationNames(task);
    for (const place of premises)
      this.#live.push(this.#add({ from: "premise", place }, recordOf(task.premises[place]!), false));
    if (task.conclusion !== null)
      this.#live.push(this.#add({ from: "conclusion" }, ["not", recordOf(task.conclusion)], true));
  }

  #add(source: PreparedFormula["source"], formula: TermFormulaRecord, goal: boolean): number {
    return this.formulas.push({ source, formula, goal }) - 1;
  }

  #make(made: MadeFormula, formula: TermFormulaRecord, goal: boolean): number {
    return this.#add({ from: "made", made }, formula, goal);
  }

  /** Unfolds definitions everywhere; they are not live any more. */
  unfold(): void {
    const definitions = orderDefinitions(
      this.#live.flatMap((number) => {
        const { formula, goal } = this.formulas[number]!;
        const definition = goal ? null : explicitDefinition(formula, number);
        return definition === null ? [] : [definition];
      }),
    );
    const dropped = new Set(definitions.map(({ number }) => number));
    /** The relation and the unfolded definition. */
    const unfolded: { relation: string; number: number }[] = [];
    const unfoldAll = (start: number) =>
      unfolded.reduce((number, definition) => this.#unfoldOne(number, definition), start);
    for (const { number, relation } of definitions) unfolded.push({ relation, number: unfoldAll(number) });
    this.#live = this.#live.filter((number) => !dropped.has(number)).map(unfoldAll);
  }

  #unfoldOne(number: number, definition: { relation: string; number: number }): number {
    const { formula, goal } = this.formulas[number]!;
    if (!relationsIn(formula).has(definition.relation)) return number;
    const result = unfoldFormula(formula, this.formulas[definition.number]!.formula);
    if (result === null) throw new Error(`formula ${definition.number} is not an explicit definition`);
    return this.#make(["unfold", number, definition.number], result, goal);
  }

  miniscope(): void {
    this.#live = this.#live.map((number) => {
      const { formula, goal } = this.formulas[number]!;
      const result = miniscopeFormula(formula);
      return JSON.stringify(result) === JSON.stringify(formula)
        ? number
        : this.#make(["miniscope", number], result, goal);
    });
  }

  nameLarge(mostClauses: number): void {
    this.#live = this.#live.map((number) => {
      const { formula, goal } = this.formulas[number]!;
      return nameLargeParts(formula, mostClauses, this.#freshName).reduce((before, part) => {
        const definition = this.#define(part, goal);
        this.#definitions.push({ ...part, number: definition });
        return this.#make(["fold", before, definition, part.result], part.result, goal);
      }, number);
    });
  }

  /** Puts names for closed parts. */
  nameClosed(isDefined: boolean): void {
    const names = new Map<string, string>();
    const definitions = new Map<string, number>();
    this.#live = this.#live.map((number) => {
      const { formula, goal } = this.formulas[number]!;
      return nameClosedParts(formula, names, this.#freshName).reduce((before, part) => {
        let definition = definitions.get(part.name);
        if (definition === undefined) {
          definition = this.#define(part, goal);
          definitions.set(part.name, definition);
          if (isDefined) this.#definitions.push({ ...part, number: definition });
        }
        return this.#make(["fold", before, definition, part.result], part.result, goal);
      }, number);
    });
  }

  #define({ name, parameters, body }: NamedPart, goal: boolean): number {
    return this.#make(["define", name, parameters, body], definitionFormula(name, parameters, body), goal);
  }

  /** The clauses, of a definition those of the directions that are of use (Plaisted & Greenbaum 1986). */
  clauses(): readonly InputClause[] {
    const ofFormulas = this.#live.flatMap((number) => this.#clausesOf(number));
    const ofDefinitions = this.#definitions.flatMap(({ number, name, positive, negative }) =>
      this.#clausesOf(number).filter(({ clause }) => (denies(clause, name) ? positive : negative)),
    );
    return [...ofFormulas, ...ofDefinitions];
  }

  #clausesOf(number: number): readonly InputClause[] {
    const { formula, goal } = this.formulas[number]!;
    return clauseForm(formula, number).map((clause, place) => ({ clause, formula: number, place, goal }));
  }
}

/** Whether a relation is negated in a clause. */
function denies(clause: ClauseRecord, relation: string): boolean {
  return clause.some((literal) => literal[0] === "not" && literal[1][1] === relation);
}
