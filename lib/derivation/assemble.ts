/**
 * From the refutation that an engine found to the derivation that evidence holds: only what is needed, shortened, and
 * numbered as the format of evidence numbers formulas, functions and lines.
 */

import type {
  ClauseRecord,
  LineRecord,
  MadeFormula,
  TermFormulaRecord,
  TermRecord,
  UseRecord,
} from "../evidence/format.ts";
import { clauseForm } from "../logic/records/clause-form.ts";
import type { Derivation, DerivationTask } from "./derive.ts";
import { type Line, usesOf } from "./lines.ts";
import { definitionFormula, freshRelationNames, type Prepared, type PreparedFormula } from "./prepare.ts";
import type { Refutation, RefutationStep } from "./refutation.ts";
import { shorten } from "./shorten.ts";

/** @param prepared what the refutation's task was */
export function assemble(task: DerivationTask, prepared: Prepared, refutation: Refutation): Derivation {
  const formulas = [...prepared.formulas, ...definedFormulas(refutation)];
  const lines = shorten(linesOf(prepared, refutation));
  const needed = neededFormulas(lines, formulas);
  const premises = needed.flatMap((number) => {
    const { source } = formulas[number]!;
    return source.from === "premise" ? [source.place] : [];
  });
  const numbers = new Map(needed.map((number, place) => [number, place]));
  const names = freshRelationNames(task);
  const relations = new Map<string, string>();
  for (const number of needed) {
    const { source } = formulas[number]!;
    if (source.from === "made" && source.made[0] === "define") relations.set(source.made[1], names());
  }
  const renaming = new Renaming(numbers, relations);
  return {
    premises,
    usesConclusion: needed.some((number) => formulas[number]!.source.from === "conclusion"),
    record: {
      made: needed.flatMap((number) => {
        const { source } = formulas[number]!;
        return source.from === "made" ? [renaming.made(source.made)] : [];
      }),
      lines: lines.map((line) => renaming.line(line)),
    },
  };
}

/** The definitions that the engine brought in. */
function definedFormulas({ definitions }: Refutation): readonly PreparedFormula[] {
  return definitions.map(({ name, parameters, body }) => ({
    source: { from: "made", made: ["define", name, parameters, body] },
    formula: definitionFormula(name, parameters, body),
    goal: false,
  }));
}

function linesOf(
  { task, condensed, formulas }: Prepared,
  { definitions, steps }: Refutation,
): readonly Line[] {
  const forms = definitions.map(({ name, parameters, body }, index) =>
    clauseForm(definitionFormula(name, parameters, body), formulas.length + index),
  );
  const lines: Line[] = [];
  /** By step: its line. A condensed clause has a line more. */
  const places: number[] = [];
  const add = (line: Line): number => lines.push(line) - 1;
  for (const step of steps) places.push(addStep(step));
  return lines;

  function addStep(step: RefutationStep): number {
    switch (step.from) {
      case "input": {
        const { clause, formula, place } = task.clauses[step.input]!;
        const smaller = condensed[step.input]!;
        const written = add({ why: "clause", clause: smaller?.from ?? clause, formula, place });
        if (smaller === null) return written;
        return add({ why: "infer", clause, uses: [{ line: written, terms: smaller.terms }] });
      }
      case "definition": {
        const clause = forms[step.definition]![step.place]!;
        return add({ why: "clause", clause, formula: formulas.length + step.definition, place: step.place });
      }
      case "identity":
        return add({ why: "identity", clause: step.clause });
      case "inference": {
        const uses = step.uses.map(([used, terms]) => ({
          line: places[used]!,
          terms: new Map(Object.entries(terms)),
        }));
        return add({ why: "infer", clause: step.clause, uses });
      }
    }
  }
}

/** The formulas that lines need, by number, ascending: those they name, and those that these are made of. */
function neededFormulas(lines: readonly Line[], formulas: readonly PreparedFormula[]): readonly number[] {
  const needed = new Set<number>();
  const need = (number: number): void => {
    if (needed.has(number)) return;
    needed.add(number);
    const { source } = formulas[number]!;
    if (source.from !== "made") return;
    const { made } = source;
    if (made[0] !== "define") need(made[1]);
    if (made[0] === "unfold" || made[0] === "fold") need(made[2]);
    if (made[0] === "define" || made[0] === "fold") functionsIn(made[3]).forEach(need);
  };
  for (const line of lines) {
    if (line.why === "clause") need(line.formula);
    functionsIn(line.clause).forEach(need);
    for (const { terms } of usesOf(line)) for (const term of terms.values()) functionsIn(term).forEach(need);
  }
  return [...needed].sort((a, b) => a - b);
}

/** What nested lists of texts are, as far as it matters here. */
type Nested = string | readonly Nested[];

const FUNCTION_NAME = /^([0-9]+)\.([0-9]+)$/;

/** The numbers of the formulas whose functions occur. */
function functionsIn(part: Nested): readonly number[] {
  if (typeof part !== "string") return part.flatMap(functionsIn);
  const match = FUNCTION_NAME.exec(part);
  return match === null ? [] : [Number(match[1])];
}

/** New numbers of formulas, also in the names of functions, and new names of defined relations. */
class Renaming {
  readonly #numbers: ReadonlyMap<number, number>;
  readonly #relations: ReadonlyMap<string, string>;

  constructor(numbers: ReadonlyMap<number, number>, relations: ReadonlyMap<string, string>) {
    this.#numbers = numbers;
    this.#relations = relations;
  }

  number(number: number): number {
    return this.#numbers.get(number)!;
  }

  relation(name: string): string {
    return this.#relations.get(name) ?? name;
  }

  made(made: MadeFormula): MadeFormula {
    switch (made[0]) {
      case "define":
        return ["define", this.relation(made[1]), made[2], this.formula(made[3])];
      case "unfold":
        return ["unfold", this.number(made[1]), this.number(made[2])];
      case "fold":
        return ["fold", this.number(made[1]), this.number(made[2]), this.formula(made[3])];
      case "miniscope":
        return ["miniscope", this.number(made[1])];
    }
  }

  line(line: Line): LineRecord {
    switch (line.why) {
      case "clause":
        return ["clause", this.number(line.formula), line.place];
      case "identity":
        return ["identity", this.clause(line.clause)];
      case "infer":
        return [
          "infer",
          this.clause(line.clause),
          line.uses.map(({ line: used, terms }): UseRecord => {
            const entries = [...terms].map(([variable, term]) => [variable, this.term(term)]);
            return [used, Object.fromEntries(entries)];
          }),
        ];
    }
  }

  formula(formula: TermFormulaRecord): TermFormulaRecord {
    return this.#all(formula) as TermFormulaRecord;
  }

  clause(clause: ClauseRecord): ClauseRecord {
    return clause.map((literal) => this.#all(literal)) as unknown as ClauseRecord;
  }

  term(term: TermRecord): TermRecord {
    return this.#all(term) as TermRecord;
  }

  /** In nested lists: a function is what begins a list and has the name of one, a relation what comes after `is`. */
  #all(part: Nested): Nested {
    if (typeof part === "string") return part;
    const [head, ...rest] = part;
    if (head === "is")
      return [head, this.relation(rest[0] as string), ...rest.slice(1).map((arg) => this.#all(arg))];
    if (typeof head !== "string") return part.map((inner) => this.#all(inner));
    const match = FUNCTION_NAME.exec(head);
    const name = match === null ? head : `${this.number(Number(match[1]))}.${match[2]}`;
    return [name, ...rest.map((inner) => this.#all(inner))];
  }
}
