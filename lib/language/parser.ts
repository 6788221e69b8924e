/** Cell text in, statements or mistakes out. */
import type { Formula, Variable } from "../logic/formula.ts";
import type { Diagnostic } from "./diagnostics.ts";
import { readFormula, settleFormula } from "./formulas.ts";
import { helpOf, laterStatements, listWords, optionHelp, statementHelp, statementList } from "./help.ts";
import type { Token } from "./lexer.ts";
import { findMixedRelation } from "./mixing.ts";
import { Names } from "./names.ts";
import { nearestName } from "./nearest.ts";
import { CellEnds, quote, Reader, Unreadable } from "./reader.ts";
import { type Binding, type StatementBody, statementReaders } from "./statement-readers.ts";
import type { ParsedCell, Scope, Statement, StatementKind } from "./statements.ts";
import { countOf } from "./wording.ts";

/** How many statements a cell may have. */
export const MAX_STATEMENTS = 5000;

/**
 * Reads a cell. Names are resolved in the scope before the cell and in what earlier statements of the cell add to
 * it. All mistakes are reported, each once; with any, there are no statements.
 */
export function parseCell(text: string, scope: Scope): ParsedCell {
  const { statements, diagnostics } = readCell(text, scope);
  return diagnostics.length > 0 ? { statements: [], diagnostics } : { statements, diagnostics };
}

/** What is known after reading a cell, mistakes or not: for completion and inspection. */
export interface CellReading extends ParsedCell {
  /** The names at the end of the cell. */
  readonly names: Names;
}

/** As {@link parseCell}, but with the statements that have no mistake, and the names bound. */
export function readCell(text: string, scope: Scope): CellReading {
  const names = new Names(scope);
  const reader = new Reader(text, names);
  const statements: Statement[] = [];
  try {
    while (!reader.isDone) {
      reader.beginStatement();
      if (reader.accept("semicolon") !== null) continue;
      if (statements.length === MAX_STATEMENTS)
        reader.endCell(`more than ${MAX_STATEMENTS} statements in one cell`);
      const statement = readStatement(reader);
      if (statement === null) continue;
      names.add(statement);
      statements.push(statement);
    }
  } catch (error) {
    if (!(error instanceof CellEnds)) throw error;
  }
  return { statements, diagnostics: inOrder(reader.diagnostics), names };
}

/** Reads one statement with its mistakes; null when it has any. */
function readStatement(reader: Reader): Statement | null {
  const mistakes = reader.diagnostics.length;
  const first = reader.peek();
  const bindings: Binding[] = [];
  let body: StatementBody | null = null;
  try {
    body = readBody(reader, bindings);
    if (!reader.at("end") && !reader.at("semicolon")) failEnd(reader, first);
    if (body !== null && reader.diagnostics.length === mistakes) reportMixed(reader, body, first);
  } catch (error) {
    if (!(error instanceof Unreadable)) throw error;
    reader.skipStatement();
  }
  if (body === null || reader.diagnostics.length > mistakes) {
    for (const { name, as } of bindings) reader.names.damage(name, as);
    return null;
  }
  const { last } = reader;
  return { ...body, text: reader.statementText(first, last), from: first.from, to: last.to } as Statement;
}

function reportMixed(reader: Reader, body: StatementBody, first: Token): void {
  const mixed = findMixedRelation(body);
  if (mixed === null) return;
  const [one, other] = mixed.places;
  reader.report(
    "places-mixed",
    { from: first.from, to: reader.last.to },
    `${quote(mixed.name)} would occur with ${countOf(one, "place")} and with ${countOf(other, "place")} in one statement`,
    "define the older definition again, or give the relation another name",
  );
}

function readBody(reader: Reader, bindings: Binding[]): StatementBody | null {
  const first = reader.peek();
  if (first.kind !== "word") reader.failExpected("a statement", hintForStart(first));
  const word = statementWord(reader, first);
  reader.next();
  return statementReaders[word](reader, bindings);
}

function hintForStart(token: Token): string | null {
  return ["and", "or", "implies", "iff", "plus", "minus"].includes(token.kind)
    ? "end the line before with the sign, or use brackets: then a statement goes on in the next line"
    : `statements are ${statementList()}`;
}

/** The statement that a line begins with; a misspelled one is reported and taken for what it is meant to be. */
function statementWord(reader: Reader, first: Token): StatementKind {
  const help = helpOf(first.text);
  if (help !== undefined) return help.word;
  if (laterStatements.includes(first.text))
    reader.fail(
      "not-in-this-version",
      first,
      `${quote(first.text)} is not a statement of this version; statements are ${statementList()}`,
    );
  const words = statementHelp.map((one) => one.word);
  const second = reader.peekAfter(1);
  const single = nearestName(first.text, words);
  const pair =
    single === null && second.kind === "word" && !second.lineStart ? pairWord(first, second) : null;
  const meant = single ?? pair;
  const last = pair === null ? first : second;
  if (meant === null) {
    const named = reader.names.find(first.text);
    if (named?.kind === "damaged") throw new Unreadable(true);
    const near = reader.names.nearest(first.text, ["relation", "formula", "theory", "structure"]);
    const subject = named !== null ? first.text : near;
    const isOption = optionHelp.some((option) => option.word === first.text);
    reader.fail(
      "unknown-statement",
      first,
      `${quote(first.text)} begins no statement; statements are ${statementList()}`,
      isOption
        ? "options stand on the same line as their statement"
        : subject === null
          ? null
          : `write \`describe ${subject}\``,
    );
  }
  reader.report(
    "unknown-statement",
    { from: first.from, to: last.to },
    `${quote(reader.excerpt(first, last))} begins no statement`,
    `write \`${meant}\``,
  );
  if (pair !== null) reader.next();
  return meant as StatementKind;
}

/** `check finite`: a statement word, rightly spelled or not, written as two words; null if it is none. */
function pairWord(first: Token, second: Token): string | null {
  const words = statementHelp.map((one) => one.word).filter((word) => word.includes("-"));
  const pair = `${first.text}-${second.text}`;
  return words.find((word) => word === pair) ?? nearestName(pair, words);
}

/** Reports what stands after a statement that could be complete. */
function failEnd(reader: Reader, first: Token): never {
  const help = helpOf(first.text);
  const found = reader.peek();
  const isOption = found.kind === "word" && (found.text === "up" || found.text === "within");
  if (help !== undefined && !help.options && isOption)
    reader.fail(
      "unexpected",
      found,
      `${quote(help.word)} takes no option, and ${quote(found.text)} begins one`,
      "leave it out",
    );
  return reader.failExpected(
    "the end of the statement",
    help === undefined ? null : `it is written \`${help.form}\``,
  );
}

/** What {@link parseFormula} came to. */
export type ParsedFormula = { readonly formula: Formula } | { readonly diagnostics: readonly Diagnostic[] };

export interface FormulaOptions {
  /** Whether variables may be free; by default they may not. */
  readonly freeVariables?: boolean;
}

/** Reads a text that is one formula, on as many lines as it likes. */
export function parseFormula(text: string, scope: Scope, options: FormulaOptions = {}): ParsedFormula {
  const reader = new Reader(text, new Names(scope));
  reader.beginStatement();
  reader.linesMatter = false;
  let formula: Formula | null = null;
  try {
    const reading = readFormula(reader);
    if (!reader.at("end")) reader.failExpected("an operator or the end of the formula");
    formula = settleFormula(reader, reading)?.formula ?? null;
    const free: readonly Variable[] = [...reading.free.keys()].sort();
    if (free.length > 0 && options.freeVariables !== true)
      reader.report(
        "free-variables",
        reading.free.get(free[0]!)!,
        `${listWords(free.map(quote))} ${free.length === 1 ? "is" : "are"} free in the formula`,
        `write \`∀${free.join(" ")}. ${reading.text}\``,
      );
  } catch (error) {
    if (!(error instanceof Unreadable) && !(error instanceof CellEnds)) throw error;
  }
  const diagnostics = inOrder(reader.diagnostics);
  return diagnostics.length > 0 || formula === null ? { diagnostics } : { formula };
}

/** By place, each once. */
function inOrder(diagnostics: readonly Diagnostic[]): readonly Diagnostic[] {
  const seen = new Set<string>();
  return [...diagnostics]
    .sort((a, b) => a.from - b.from || a.to - b.to)
    .filter(({ code, from, to }) => {
      const key = `${code} ${from} ${to}`;
      if (seen.has(key)) return false;
      seen.add(key);
      return true;
    });
}
