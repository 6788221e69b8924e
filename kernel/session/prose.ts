/** Values for sentences of prose, as `user_expressions` ask for them: short, and without changing anything. */
import { countModels } from "../../lib/inquiry/count.ts";
import type { Work } from "../../lib/inquiry/work.ts";
import { type ProseExpression, readExpression } from "../../lib/language/expressions.ts";
import type { Definition } from "../../lib/language/statements.ts";
import { DEFAULT_BUDGET } from "../../lib/logic/meter.ts";
import {
  inlineFormula,
  inlineNumber,
  inlineStructure,
  inlineText,
  inlineTheory,
  inlineVerdict,
} from "../display/inline.ts";
import type { ExpressionOutcome, MimeBundle } from "./evaluator.ts";
import type { LedgerEntry, Memory } from "./run-cell.ts";

/** What keeps an expression from having a value: a mistake of the user's, in words. */
class NoValue extends Error {}

/** Evaluates one expression; each has its own value or its own mistake. */
export function evaluateProse(text: string, memory: Memory, isInterrupted: () => boolean): ExpressionOutcome {
  const read = readExpression(text, memory.scope);
  if ("diagnostics" in read) {
    const [first] = read.diagnostics;
    return mistaken(
      first?.suggestion == null ? (first?.message ?? "") : `${first.message}; ${first.suggestion}`,
    );
  }
  try {
    return { status: "ok", data: evaluate(read.expression, memory, isInterrupted), metadata: {} };
  } catch (problem) {
    if (problem instanceof NoValue) return mistaken(problem.message);
    throw problem;
  }
}

function evaluate(expression: ProseExpression, memory: Memory, isInterrupted: () => boolean): MimeBundle {
  switch (expression.kind) {
    case "verdict":
      return inlineVerdict(entryOf(expression.claim, memory).verdict);
    case "reason":
      return reasonOf(entryOf(expression.claim, memory));
    case "claim":
      return inlineText(entryOf(expression.claim, memory).text);
    case "count":
      return inlineNumber(countOn(expression, isInterrupted));
    case "formula":
      return inlineFormula(expression.formula.formula);
    case "axioms":
      return inlineTheory(expression.theory.theory);
    case "definition":
      return definitionValue(expression.definition);
  }
}

function definitionValue(definition: Definition): MimeBundle {
  switch (definition.kind) {
    case "theory":
      return inlineTheory(definition.theory);
    case "structure":
      return inlineStructure(definition.structure);
    case "formula":
      return inlineFormula(definition.body);
  }
}

function entryOf(number: number, { ledger }: Memory): LedgerEntry {
  const entry = ledger[number - 1];
  if (entry !== undefined) return entry;
  throw new NoValue(
    `there is no claim ${number}; so far there ${ledger.length === 1 ? "is 1" : `are ${ledger.length}`}`,
  );
}

function reasonOf({ number, reason }: LedgerEntry): MimeBundle {
  if (reason !== null) return reason;
  throw new NoValue(`claim ${number} does not rest on a reason why there is no finite model`);
}

function countOn(
  { theory, size, labelled }: ProseExpression & { kind: "count" },
  isInterrupted: () => boolean,
): bigint {
  const work: Work = {
    budget: DEFAULT_BUDGET,
    upTo: size,
    symmetricUpTo: 0,
    isInterrupted,
    report: () => undefined,
  };
  const { sizes, ended } = countModels(theory.theory, false, work, size);
  const counted = labelled ? sizes[0]?.labelled : sizes[0]?.unlabelled;
  if (counted != null) return counted;
  throw new NoValue(
    `the models of ${theory.text} on ${size} points were not counted: ${ended === "interrupted" ? "interrupted" : `the bound on ${ended === "memory" ? "memory" : "steps"} was met`}`,
  );
}

function mistaken(evalue: string): ExpressionOutcome {
  return { status: "error", ename: "Mistakes", evalue, traceback: [`Mistakes: ${evalue}`] };
}
