/**
 * The whole way of a cell: text, statements, questions, answers that the checker has accepted, displays.
 *
 * A cell with a mistake of form runs nothing. A claim that is not established does not stop the cell: the rest runs,
 * and the cell ends with one error that lists those claims. An interrupt stops the cell; what was shown and defined
 * before it stays.
 */
import type { ClaimVerdict } from "../../lib/inquiry/answer.ts";
import { parseCell } from "../../lib/language/parser.ts";
import { type Scope, type Statement, scopeAfter } from "../../lib/language/statements.ts";
import { type Spent, WorkEnded } from "../../lib/logic/meter.ts";
import { showAnswer } from "../display/answers.ts";
import { showProgress } from "../display/bundle.ts";
import { dataOf } from "../display/data.ts";
import { inlineReason } from "../display/inline.ts";
import { showTrouble } from "../display/trouble.ts";
import type { CellEvent, CellOutcome, MimeBundle, StatementResult } from "./evaluator.ts";
import { storeResult } from "./metadata.ts";
import { answerQuestion, isQuestion, type Question, type Watch, wasInterrupted } from "./run-statement.ts";
import { type Telling, tell } from "./tell.ts";

/** Time without a result after which progress is shown, and between two showings, in milliseconds. */
const FIRST_PROGRESS_MS = 1000;
const NEXT_PROGRESS_MS = 400;

/** A claim of the notebook and what it came to. */
export interface LedgerEntry {
  /** Numbered from 1 in the order of the session. */
  readonly number: number;
  readonly statement: "claim" | "conjecture";
  readonly text: string;
  readonly verdict: ClaimVerdict;
  readonly summary: string;
  /** Why there is no finite model, for prose; null when the claim does not rest on that. */
  readonly reason: MimeBundle | null;
}

/** What a session remembers from cell to cell. */
export interface Memory {
  scope: Scope;
  readonly ledger: LedgerEntry[];
  /** A new id for a display, unique in the session. */
  nextDisplayId(): string;
}

/** The surroundings of a running cell. */
export interface Surroundings {
  readonly isInterrupted: () => boolean;
  readonly show: (event: CellEvent) => void;
  /** Milliseconds; used for progress displays only, never for an answer. */
  readonly clock: () => number;
}

export function runCell(code: string, memory: Memory, surroundings: Surroundings): CellOutcome {
  const { statements, diagnostics } = parseCell(code, memory.scope);
  if (diagnostics.length > 0) {
    const evalue =
      diagnostics.length === 1 ? diagnostics[0]!.message : `${diagnostics.length} mistakes; nothing was run`;
    const result: StatementResult = {
      statement: "cell",
      text: code,
      verdict: null,
      summary: evalue,
      steps: 0,
      data: {},
      evidence: null,
      diagnostics,
    };
    return failed("Mistakes", evalue, showTrouble(diagnostics, code), [result]);
  }
  const results: StatementResult[] = [];
  const unmet: StatementResult[] = [];
  let answered = 0;
  for (const statement of statements) {
    try {
      if (surroundings.isInterrupted()) throw new WorkEnded("interrupted");
      const { result, interrupted } = runStatement(statement, memory, surroundings);
      results.push(result);
      if (interrupted) throw new WorkEnded("interrupted");
      answered += 1;
      if (statement.kind === "claim" && result.verdict !== "holds") unmet.push(result);
    } catch (problem) {
      if (problem instanceof WorkEnded)
        return failed("Interrupted", ...interruption(statement, answered, statements.length), results);
      const { message, stack } = problem instanceof Error ? problem : new Error(String(problem));
      const lines = [`A mistake of Twoplace itself in: ${statement.text}`, ...(stack ?? message).split("\n")];
      return failed("InternalError", message, lines, results);
    }
  }
  if (unmet.length > 0) return failed("FailedClaims", ...unmetClaims(unmet), results);
  return { status: "ok", results };
}

function failed(
  ename: string,
  evalue: string,
  traceback: readonly string[],
  results: readonly StatementResult[],
): CellOutcome {
  return { status: "error", ename, evalue, traceback, results };
}

function interruption(statement: Statement, answered: number, of: number): [string, string[]] {
  const evalue = `stopped at: ${statement.text}`;
  const kept = `${answered} of ${of} statements had been answered; all definitions before this one are kept.`;
  return [evalue, [`Interrupted: ${evalue}`, kept]];
}

function unmetClaims(unmet: readonly StatementResult[]): [string, string[]] {
  const evalue =
    unmet.length === 1 ? "a claim is not established" : `${unmet.length} claims are not established`;
  return [
    evalue,
    [`FailedClaims: ${evalue}`, ...unmet.map((claim) => `  ${claim.text}\n    ${claim.summary}`)],
  ];
}

/** What a statement shows, and its result. */
interface Shown {
  readonly result: StatementResult;
  readonly data: MimeBundle;
  /** Why there is no finite model, for prose; null when nothing rests on that. */
  readonly reason: MimeBundle | null;
  readonly interrupted: boolean;
}

function runStatement(statement: Statement, memory: Memory, surroundings: Surroundings): Shown {
  const display = new Display(memory.nextDisplayId(), surroundings);
  const watch: Watch = {
    isInterrupted: (spent) => {
      display.tick(spent);
      return surroundings.isInterrupted();
    },
    report: (doing) => display.note(doing),
  };
  const shown = isQuestion(statement) ? ask(statement, watch) : show(statement, watch);
  memory.scope = scopeAfter(memory.scope, statement);
  const { result } = shown;
  if (statement.kind === "claim" || statement.kind === "conjecture")
    memory.ledger.push({
      number: memory.ledger.length + 1,
      statement: statement.kind,
      text: result.text,
      verdict: result.verdict as ClaimVerdict,
      summary: result.summary,
      reason: shown.reason,
    });
  display.finish(shown.data, result);
  return shown;
}

/** Answers a question. */
function ask(question: Question, watch: Watch): Shown {
  const answer = answerQuestion(question, watch);
  const { summary, data } = showAnswer(question, answer);
  const result = {
    statement: question.kind,
    text: question.text,
    verdict: answer.verdict,
    summary,
    steps: answer.steps,
    data: dataOf(question, answer),
    evidence: answer.evidence,
    diagnostics: [],
  };
  const reason = inlineReason(question, answer);
  return { result, data, reason, interrupted: wasInterrupted(answer) };
}

/** Shows what a statement that asks nothing brings about. */
function show(statement: Telling, watch: Watch): Shown {
  const { summary, data, result, interrupted } = tell(statement, watch);
  return {
    result: {
      statement: statement.kind,
      text: statement.text,
      verdict: null,
      summary,
      steps: result.steps,
      data: result.data,
      evidence: result.evidence,
      diagnostics: [],
    },
    data,
    reason: null,
    interrupted,
  };
}

/** One statement's place on the page: progress, then the result in its stead. */
class Display {
  readonly #id: string;
  readonly #surroundings: Surroundings;
  #next: number;
  #doing = "";
  #begun = false;

  constructor(id: string, surroundings: Surroundings) {
    this.#id = id;
    this.#surroundings = surroundings;
    this.#next = surroundings.clock() + FIRST_PROGRESS_MS;
  }

  /** Notes what is being done. */
  note(doing: string): void {
    this.#doing = doing;
  }

  /** Shows progress when it is time to. */
  tick({ steps, limit }: Spent): void {
    const now = this.#surroundings.clock();
    if (now < this.#next || this.#doing === "") return;
    this.#next = now + NEXT_PROGRESS_MS;
    this.#show(showProgress({ doing: this.#doing, steps, limit }), {});
  }

  finish(data: MimeBundle, result: StatementResult): void {
    this.#show(data, { twoplace: storeResult(result) });
  }

  #show(data: MimeBundle, metadata: Readonly<Record<string, unknown>>): void {
    this.#surroundings.show({ kind: "display", displayId: this.#id, update: this.#begun, data, metadata });
    this.#begun = true;
  }
}
