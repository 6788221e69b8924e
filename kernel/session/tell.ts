/** Statements that ask no question: what they define, declare, describe, bring into a form or write. */
import { writeDimacs } from "../../lib/inquiry/dimacs.ts";
import { examineProperties, type Findings } from "../../lib/inquiry/examine.ts";
import type { Work } from "../../lib/inquiry/work.ts";
import { printArithmetic } from "../../lib/language/carrier-smt-lib.ts";
import { printSmtLib } from "../../lib/language/smt-lib.ts";
import type { Statement, WrittenSubject } from "../../lib/language/statements.ts";
import { WorkEnded } from "../../lib/logic/meter.ts";
import { normalise } from "../../lib/logic/normal-forms/normalise.ts";
import type { Shown } from "../display/answers.ts";
import { dataOf } from "../display/data.ts";
import { showDefinition, showDescription } from "../display/definitions.ts";
import { normalFormData, showNormalForm } from "../display/normal-forms.ts";
import { showUnwritten, showWritten, writtenData } from "../display/written.ts";
import type { StatementResult } from "./evaluator.ts";
import type { Question, Watch } from "./run-statement.ts";

/** Any statement that is not a question. */
export type Telling = Exclude<Statement, Question>;

/** What is shown and kept of a statement. */
export interface Told extends Shown {
  readonly result: Pick<StatementResult, "data" | "evidence" | "steps">;
  readonly interrupted: boolean;
}

/** Steps that `describe` may spend on looking for models with and without named properties. */
const DESCRIBE_BUDGET = 10_000;
/** Sizes of models that `describe` looks at. */
const DESCRIBE_UP_TO = 4;
/** Steps that `write` may spend on laying clauses out. */
const WRITE_BUDGET = 20_000;

export function tell(statement: Telling, watch: Watch): Told {
  switch (statement.kind) {
    case "relation":
    case "define":
      return plain(showDefinition(statement), dataOf(statement, null));
    case "describe":
      return describe(statement, watch);
    case "normalise": {
      const result = normalise(statement.subject.formula, statement.form);
      return plain(showNormalForm(statement, result), normalFormData(statement, result));
    }
    case "write":
      return write(statement, { ...watch, budget: WRITE_BUDGET, upTo: 1, symmetricUpTo: 0 });
  }
}

function plain(shown: Shown, data: StatementResult["data"]): Told {
  return { ...shown, result: { data, evidence: null, steps: 0 }, interrupted: false };
}

function describe(statement: Telling & { kind: "describe" }, watch: Watch): Told {
  const { subject } = statement;
  if (subject.kind !== "theory") return plain(showDescription(statement, null), dataOf(statement, null));
  const work: Work = { ...watch, budget: DESCRIBE_BUDGET, upTo: DESCRIBE_UP_TO, symmetricUpTo: 0 };
  const findings: Findings = examineProperties(subject.theory.theory, work);
  const shown = showDescription(statement, findings);
  const data = dataOf(statement, null, findings);
  const { evidence, steps, interrupted } = findings;
  return { ...shown, result: { data, evidence, steps }, interrupted };
}

function write(statement: Telling & { kind: "write" }, work: Work): Told {
  const { subject, format } = statement;
  if (subject.kind === "structure") {
    const text = writeTruths(subject);
    return plain(
      text === null ? showUnwritten(statement, "not-of-numbers") : showWritten(statement, text),
      writtenData(statement, text),
    );
  }
  const { theory, conclusion } = subject;
  const sentence = conclusion?.formula ?? null;
  if (format.kind === "smt-lib") {
    const text = printSmtLib(theory.theory, sentence);
    return plain(showWritten(statement, text), writtenData(statement, text));
  }
  const written = writeDimacs(theory.theory, sentence, format.size, work);
  if ("text" in written)
    return plain(showWritten(statement, written.text), writtenData(statement, written.text));
  if (written.ended === "interrupted") throw new WorkEnded(written.ended);
  return plain(showUnwritten(statement, written.ended), writtenData(statement, null));
}

/** The problems of all sentences, one after the other, each beginning anew; null when one cannot be written. */
function writeTruths({ structure, sentences }: WrittenSubject & { kind: "structure" }): string | null {
  const scripts = sentences.map(({ name, formula }) => printArithmetic(structure.structure, formula, name));
  return scripts.includes(null) ? null : scripts.join("(reset)\n");
}
