/**
 * A finished notebook held against its evidence, without searching: each cell is read with the definitions before it,
 * and each stored result must belong to a statement of its cell, to the question that this statement asks now, and to
 * evidence that the checker accepts.
 */
import * as v from "valibot";
import { checkEvidence, meterForCheck } from "../../lib/evidence/check.ts";
import type { Evidence } from "../../lib/evidence/format.ts";
import { type Asked, digestOfAsked } from "../../lib/inquiry/question-record.ts";
import { parseCell } from "../../lib/language/parser.ts";
import {
  emptyScope,
  type ParsedCell,
  type Scope,
  type Statement,
  scopeAfter,
} from "../../lib/language/statements.ts";
import { dataOf } from "../display/data.ts";
import { type Cell, type CodeCell, joinLines, type Notebook, type Output } from "../notebook/nbformat.ts";
import type { MimeBundle } from "../session/evaluator.ts";
import { loadEvidence } from "../session/metadata.ts";
import { askedOf, isQuestion } from "../session/run-statement.ts";
import { tell } from "../session/tell.ts";
import { findOtherText } from "./recheck-display.ts";
import { findDisagreement } from "./recheck-words.ts";

/** What rechecking a stored result, or a statement without one, came to. */
export interface Finding {
  /** Counted from 1 among all cells. */
  readonly cell: number;
  /** The statement's text on one line; for a cell as a whole, what is wrong with it. */
  readonly text: string;
  readonly verdict: string | null;
  /**
   * - `accepted`: the checker has accepted the evidence, and it is evidence for what is stored;
   * - `open`: nothing is claimed;
   * - `computed`: a result that carries no evidence, or not for all of it;
   * - `read again`: a definition, or what follows from the text alone, comes out the same;
   * - `missing`: a statement without a result;
   * - `does not hold`: anything else.
   */
  readonly outcome: "accepted" | "open" | "computed" | "read again" | "missing" | "does not hold";
  /** Why it does not hold, or what is not certified; null where there is nothing to say. */
  readonly remark: string | null;
}

/** The key under which results stand in the metadata of outputs. */
const KEY = "twoplace";

const resultSchema = v.strictObject({
  statement: v.string(),
  text: v.string(),
  verdict: v.nullable(v.string()),
  summary: v.string(),
  steps: v.pipe(v.number(), v.safeInteger(), v.minValue(0)),
  data: v.record(v.string(), v.unknown()),
  evidence: v.nullable(v.record(v.string(), v.unknown())),
  diagnostics: v.array(v.unknown()),
});
type StoredResult = v.InferOutput<typeof resultSchema>;

/** An output that Twoplace has written. */
interface StoredOutput {
  readonly result: StoredResult;
  readonly data: Readonly<Record<string, unknown>>;
}

/** Rechecks all code cells in order. {@link prepareDrawing} must have been awaited. */
export function recheckNotebook(notebook: Notebook): readonly Finding[] {
  let scope: Scope = emptyScope;
  return notebook.cells.flatMap((cell, index) => {
    if (cell.cell_type !== "code") return [];
    const parsed = parseCell(joinLines(cell.source), scope);
    scope = parsed.statements.reduce(scopeAfter, scope);
    return recheckCell(cell, index + 1, parsed);
  });
}

function recheckCell(
  cell: CodeCell,
  number: number,
  { statements, diagnostics }: ParsedCell,
): readonly Finding[] {
  const problem = (text: string, remark: string): Finding => ({
    cell: number,
    text,
    verdict: null,
    outcome: "does not hold",
    remark,
  });
  const findings: Finding[] = [];
  const stored: StoredOutput[] = [];
  for (const [place, output] of cell.outputs.entries()) {
    if (!isOwn(output)) continue;
    const read = v.safeParse(resultSchema, output.metadata[KEY]);
    if (read.success) stored.push({ result: read.output, data: output.data });
    else findings.push(problem(`output ${place + 1}`, `its metadata are damaged: ${read.issues[0].message}`));
  }
  if (diagnostics.length > 0) {
    const remark = diagnostics[0]!.message;
    // A cell that shows a mistake on purpose has Jupyter's tag for it, and no result.
    if (!mayFail(cell) || stored.length > 0) findings.push(problem("the cell cannot be read", remark));
    return findings;
  }
  const outputs = matchOutputs(statements, stored);
  for (const statement of statements) {
    const output = outputs.get(statement);
    if (output !== undefined) findings.push({ cell: number, ...recheckOutput(statement, output) });
    else if (isQuestion(statement)) findings.push({ cell: number, ...missing(statement) });
  }
  const matched = new Set(outputs.values());
  for (const output of stored)
    if (!matched.has(output))
      findings.push(
        problem(
          oneLine(output.result.text),
          "no statement of this cell reads like that: the cell has been edited since it was run, or the output is that of another cell",
        ),
      );
  return findings;
}

function isOwn(output: Output): output is Output & { output_type: "display_data" | "execute_result" } {
  if (output.output_type !== "display_data" && output.output_type !== "execute_result") return false;
  return Object.hasOwn(output.metadata, KEY);
}

function mayFail({ metadata }: Cell): boolean {
  return Array.isArray(metadata.tags) && metadata.tags.includes("raises-exception");
}

function oneLine(text: string): string {
  return text.replace(/\s+/g, " ");
}

/** For each statement the first output that was made of the same text and is not another statement's. */
function matchOutputs(
  statements: readonly Statement[],
  stored: readonly StoredOutput[],
): ReadonlyMap<Statement, StoredOutput> {
  const left = [...stored];
  const found = new Map<Statement, StoredOutput>();
  for (const statement of statements) {
    const place = left.findIndex(
      ({ result }) => result.statement === statement.kind && result.text === statement.text,
    );
    if (place !== -1) found.set(statement, left.splice(place, 1)[0]!);
  }
  return found;
}

function missing(statement: Statement): Omit<Finding, "cell"> {
  return {
    text: oneLine(statement.text),
    verdict: null,
    outcome: "missing",
    remark: "no result is stored: run the notebook again",
  };
}

function recheckOutput(statement: Statement, { result, data }: StoredOutput): Omit<Finding, "cell"> {
  const text = oneLine(statement.text);
  const { verdict } = result;
  const judge = (outcome: Finding["outcome"], remark: string | null) => ({ text, verdict, outcome, remark });
  let evidence: Evidence | null;
  try {
    evidence = loadEvidence(result.evidence) as Evidence | null;
  } catch (problem) {
    return judge("does not hold", `the stored evidence is damaged: ${(problem as Error).message}`);
  }
  const wrong =
    findRejection(statement, evidence) ??
    findOtherQuestion(statement, evidence) ??
    findDisagreement(statement, result, evidence) ??
    findOtherReading(statement, result) ??
    (isQuestion(statement) ? findOtherText(result, data as MimeBundle) : null);
  if (wrong !== null) return judge("does not hold", wrong);
  if (!isQuestion(statement) && evidence === null) return judge("read again", null);
  const uncertified = uncertifiedPart(statement, result);
  if (evidence === null) return uncertified === null ? judge("open", null) : judge("computed", uncertified);
  return judge("accepted", uncertified);
}

function findRejection(statement: Statement, evidence: unknown): string | null {
  if (evidence === null) return null;
  const budget = isQuestion(statement) ? statement.options.within : null;
  const check = checkEvidence(evidence, meterForCheck(budget ?? undefined));
  return check.accepted ? null : `the checker rejects the evidence: ${check.reason}`;
}

/** The digest that evidence for a statement has now; null for a statement that has none. */
function digestNow(statement: Statement): string | null {
  const asked: Asked | null = isQuestion(statement)
    ? askedOf(statement)
    : statement.kind === "describe" && statement.subject.kind === "theory"
      ? { ask: "models", theory: statement.subject.theory.theory }
      : null;
  return asked === null ? null : digestOfAsked(asked);
}

function findOtherQuestion(statement: Statement, evidence: Evidence | null): string | null {
  if (evidence === null || evidence.digest === digestNow(statement)) return null;
  return "the evidence is for another question: what the names in the statement stand for has changed since it was run";
}

const NEVER = { isInterrupted: () => false, report: () => undefined };

/** What statements that ask nothing come to is worked out again, as far as that takes no search. */
function findOtherReading(statement: Statement, { data }: StoredResult): string | null {
  if (isQuestion(statement)) return null;
  const isSearched = statement.kind === "describe" && statement.subject.kind === "theory";
  const now = isSearched ? dataOf(statement, null) : tell(statement, NEVER).result.data;
  const { properties, ...plain } = data;
  const before = isSearched ? plain : data;
  if (sortedText(now) === sortedText(before)) return null;
  return "it reads otherwise now: what its names stand for has changed since it was run";
}

/** JSON with sorted keys: notebooks are stored with their keys sorted. */
function sortedText(value: unknown): string {
  return JSON.stringify(value, (_, part: unknown) =>
    typeof part === "object" && part !== null && !Array.isArray(part)
      ? Object.fromEntries(Object.entries(part).sort(([a], [b]) => (a < b ? -1 : 1)))
      : part,
  );
}

/** What of a result rests on a search alone, for people. */
function uncertifiedPart(statement: Statement, { data }: StoredResult): string | null {
  switch (statement.kind) {
    case "count":
      return "counts are computed, not certified";
    case "models":
      return data.complete === true ? "that there are no others is computed, not certified" : null;
    case "check-finite": {
      const { leastSize, provenUpTo } = data;
      const isLeast = typeof leastSize === "number" && leastSize - 1 > Number(provenUpTo ?? 0);
      return isLeast ? "that none is smaller is computed, not certified" : null;
    }
    case "describe":
      return "sizes without a model are computed, not certified";
    default:
      return null;
  }
}
