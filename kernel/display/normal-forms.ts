/** Normal forms: the form, what it keeps, where its functions and definitions come from, and the way there. */

import { printFormula } from "../../lib/language/printer.ts";
import type { Statement } from "../../lib/language/statements.ts";
import type {
  Clause,
  ClauseSet,
  DefinedRelation,
  FunctionSymbol,
  Term,
  TermAtom,
  TermEquality,
  TermFormula,
} from "../../lib/logic/clausal.ts";
import { type Variable, verum } from "../../lib/logic/formula.ts";
import { NORMAL_FORM_NAMES } from "../../lib/logic/normal-forms/normalise.ts";
import type {
  NormalFormName,
  NormalFormResult,
  NormalFormStep,
  NormalFormValue,
} from "../../lib/logic/normal-forms/result.ts";
import type { Shown } from "./answers.ts";
import { type Block, code, formulaOf, type Inline, line, note, termOf } from "./blocks.ts";
import { renderBundle } from "./bundle.ts";
import { counted, shorten } from "./text.ts";

type Normalise = Statement & { readonly kind: "normalise" };

/** Columns of a formula in the one line for the ledger; all of it stands below. */
const SUMMARY_WIDTH = 90;

/** How `normalise` is told which form is wanted. */
const FORM_WORDS: Readonly<Record<NormalFormName, string>> = {
  negation: "negation",
  prenex: "prenex",
  miniscoped: "miniscoped",
  skolem: "Skolem",
  clause: "clause",
  "definitional-clause": "definitional clause",
  disjunctive: "disjunctive",
};

/** `normalise φ to F`. */
export function showNormalForm(statement: Normalise, result: NormalFormResult): Shown {
  const summary = summariseForm(statement, result);
  const asked = line(code(statement.text.replace(/\s+/g, " ")));
  if (result.outcome === "refused") {
    const hint =
      result.suggestion === null
        ? []
        : [line("A form that stays small: ", code(`to ${FORM_WORDS[result.suggestion]}`))];
    return { summary, data: renderBundle([line(summary), asked, ...hint], "with-latex") };
  }
  const { value, steps, keeps } = result;
  const blocks: Block[] = [
    line(`${NORMAL_FORM_NAMES[statement.form]}, ${keeps}${sizeText(value)}`),
    asked,
    ...valueBlocks(value),
    note(keeps === "equivalent" ? EQUIVALENT : EQUISATISFIABLE),
  ];
  if (statement.steps) blocks.push(stepsBlock(statement.subject.formula, steps));
  return { summary, data: renderBundle(blocks, "with-latex") };
}

const EQUIVALENT = "Equivalent: true in the same structures as the formula.";
const EQUISATISFIABLE =
  "Equisatisfiable: a structure is a model of the formula exactly when the added symbols can be interpreted in it so that the form holds.";

function summariseForm({ form }: Normalise, result: NormalFormResult): string {
  if (result.outcome === "refused") return `no ${NORMAL_FORM_NAMES[form]}: ${result.message}`;
  const { keeps, value } = result;
  const head = `${NORMAL_FORM_NAMES[form]}, ${keeps}`;
  if (value.kind === "clauses") return head + sizeText(value);
  return `${head}: ${shorten(printFormula(value.formula, "unicode"), SUMMARY_WIDTH)}`;
}

function sizeText(value: NormalFormValue): string {
  if (value.kind !== "clauses") return "";
  const { clauses, functions, definitions } = value.clauses;
  const skolem = functions.filter(({ origin }) => origin.kind === "skolem");
  const parts = [counted(clauses.length, "clause")];
  if (skolem.length > 0) parts.push(counted(skolem.length, "Skolem function"));
  if (definitions.length > 0) parts.push(counted(definitions.length, "definition"));
  return `: ${parts.join(", ")}`;
}

function valueBlocks(value: NormalFormValue): readonly Block[] {
  switch (value.kind) {
    case "formula":
      return [line(formulaOf(value.formula))];
    case "skolem":
      return [line(formulaOf(value.formula)), ...functionsBlocks(value.functions)];
    case "clauses":
      return [
        clausesBlock(value.clauses),
        ...(value.clauses.clauses.length === 0
          ? []
          : [note("Each clause is said of all values of its variables.")]),
        ...functionsBlocks(value.clauses.functions),
        ...definitionsBlocks(value.clauses.definitions),
      ];
  }
}

function clausesBlock({ clauses }: ClauseSet): Block {
  if (clauses.length === 0) return line("no clauses: the formula is valid");
  return {
    kind: "table",
    caption: null,
    head: ["no.", "clause"],
    rows: clauses.map((clause, index) => [[String(index + 1)], [formulaOf(matrixOf(clause))]]),
    look: "prose",
  };
}

/** What each new function stands for. */
function functionsBlocks(functions: readonly FunctionSymbol[]): readonly Block[] {
  if (functions.length === 0) return [];
  return [
    {
      kind: "table",
      caption: null,
      head: ["function", "stands for", "in"],
      rows: functions.map((symbol): readonly (readonly Inline[])[] => {
        const { origin } = symbol;
        const args: readonly Variable[] = origin.kind === "skolem" ? origin.parameters : [];
        const sought: readonly Inline[] = [termOf(origin.variable)];
        return [
          [termOf({ symbol, args })],
          origin.kind === "skolem" ? sought : ["the free variable ", ...sought],
          [origin.kind === "skolem" ? formulaOf(origin.formula) : "the whole formula"],
        ];
      }),
      look: "prose",
    },
  ];
}

function definitionsBlocks(definitions: readonly DefinedRelation[]): readonly Block[] {
  if (definitions.length === 0) return [];
  const words = { implies: "implies", implied: "is implied by", both: "if and only if" };
  return [
    {
      kind: "table",
      caption: null,
      head: ["defined", "its clauses say", "of"],
      rows: definitions.map((relation) => [
        [formulaOf({ kind: "atom", relation, args: relation.origin.parameters })],
        [words[relation.origin.direction]],
        [formulaOf(relation.origin.body)],
      ]),
      look: "prose",
    },
  ];
}

function stepsBlock(start: TermFormula, steps: readonly NormalFormStep[]): Block {
  if (steps.length === 0) return note("No steps: the formula has this form already.");
  return {
    kind: "table",
    caption: "Steps",
    head: ["step", "what was done", "result"],
    rows: [
      [["0"], ["as given"], [formulaOf(start)]],
      ...steps.map((step, index): readonly (readonly Inline[])[] => [
        [String(index + 1)],
        [stepText(step)],
        valueParts(step.value),
      ]),
    ],
    look: "prose",
  };
}

function stepText({ done, times, keeps }: NormalFormStep): string {
  const often = times === 1 ? "" : `, ${counted(times, "time")}`;
  return `${done}${often}${keeps === "equivalent" ? "" : " (equisatisfiable)"}`;
}

/** The value in one cell of a table. */
function valueParts(value: NormalFormValue): readonly Inline[] {
  if (value.kind !== "clauses") return [formulaOf(value.formula)];
  const { clauses } = value.clauses;
  if (clauses.length === 0) return ["no clauses"];
  return clauses.flatMap((clause, index): Inline[] =>
    index === 0 ? [formulaOf(matrixOf(clause))] : ["; ", formulaOf(matrixOf(clause))],
  );
}

/** The disjunction that a clause is, without its quantifiers. */
function matrixOf({ literals }: Clause): TermFormula {
  const parts = literals.map(
    ({ positive, atom }): TermFormula => (positive ? atom : { kind: "not", body: atom }),
  );
  if (parts.length === 1) return parts[0]!;
  return parts.length === 0 ? { kind: "false" } : { kind: "or", parts };
}

/** For `eval --json`: the form as one sentence in the ASCII spelling, and what belongs to it. */
export function normalFormData(
  statement: Normalise,
  result: NormalFormResult,
): Readonly<Record<string, unknown>> {
  const { form } = statement;
  if (result.outcome === "refused")
    return { formula: null, form, keeps: null, refused: result.code, limit: result.limit };
  const { value, keeps, steps } = result;
  return {
    formula: ascii(sentenceOf(value)),
    form,
    keeps,
    ...(value.kind === "clauses"
      ? { clauses: value.clauses.clauses.map((clause) => ascii(matrixOf(clause))) }
      : {}),
    functions: functionsOf(value).map(({ name, places, origin }) => ({
      name,
      places,
      variable: origin.variable,
      origin: origin.kind,
      formula: origin.kind === "skolem" ? ascii(origin.formula) : null,
    })),
    definitions: (value.kind === "clauses" ? value.clauses.definitions : []).map(
      ({ name, places, origin }) => ({
        name,
        places,
        parameters: origin.parameters,
        direction: origin.direction,
        formula: ascii(origin.body),
      }),
    ),
    ...(statement.steps
      ? {
          steps: steps.map((step) => ({
            done: step.done,
            times: step.times,
            keeps: step.keeps,
            formula: ascii(sentenceOf(step.value)),
          })),
        }
      : {}),
  };
}

function functionsOf(value: NormalFormValue): readonly FunctionSymbol[] {
  switch (value.kind) {
    case "formula":
      return [];
    case "skolem":
      return value.functions;
    case "clauses":
      return value.clauses.functions;
  }
}

/** Clauses as the conjunction of their universal closures. */
function sentenceOf(value: NormalFormValue): TermFormula {
  if (value.kind !== "clauses") return value.formula;
  const parts = value.clauses.clauses.map((clause) =>
    variablesIn(clause).reduceRight<TermFormula>(
      (body, variable) => ({ kind: "forall", variable, body }),
      matrixOf(clause),
    ),
  );
  if (parts.length === 1) return parts[0]!;
  return parts.length === 0 ? verum : { kind: "and", parts };
}

/** In the order in which they occur. */
function variablesIn({ literals }: Clause): readonly Variable[] {
  const found = new Set<Variable>();
  const see = (term: Term): void => {
    if (typeof term === "string") found.add(term);
    else term.args.forEach(see);
  };
  for (const { atom } of literals) termsOf(atom).forEach(see);
  return [...found];
}

function termsOf(atom: TermAtom | TermEquality): readonly Term[] {
  return atom.kind === "atom" ? atom.args : [atom.left, atom.right];
}

function ascii(formula: TermFormula): string {
  return printFormula(formula, "ascii");
}
