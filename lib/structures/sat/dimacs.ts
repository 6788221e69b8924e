/**
 * DIMACS CNF, the common text format for clauses (DIMACS, "Satisfiability: Suggested Format", 1993): lines that
 * begin with `c` are comments, one line `p cnf VARIABLES CLAUSES` comes before the clauses, and a clause is signed
 * integers that end in 0, over any number of lines.
 */

export interface Cnf {
  readonly variableCount: number;
  /** Signed literals. */
  readonly clauses: readonly (readonly number[])[];
  /** The text of the comment lines without their `c `. */
  readonly comments: readonly string[];
}

/** What is wrong with a DIMACS text. */
export interface DimacsProblem {
  readonly code:
    | "no-header"
    | "header-twice"
    | "bad-header"
    | "not-a-literal"
    | "variable-out-of-range"
    | "unfinished-clause"
    | "clause-count-differs";
  readonly message: string;
  /** Counted from 1. */
  readonly line: number;
}

export type DimacsResult = { readonly cnf: Cnf } | { readonly problems: readonly DimacsProblem[] };

/**
 * Prints clauses as DIMACS CNF, one to a line.
 * @param comments lines of text that come first; one with line breaks becomes several
 */
export function printDimacs(
  variableCount: number,
  clauses: readonly (readonly number[])[],
  comments: readonly string[] = [],
): string {
  const lines = comments
    .flatMap((comment) => comment.split(/\r\n|\r|\n/))
    .map((line) => `c ${line}`.trimEnd());
  lines.push(`p cnf ${variableCount} ${clauses.length}`);
  for (const clause of clauses) lines.push([...clause, 0].join(" "));
  return `${lines.join("\n")}\n`;
}

/** After this many problems a text is hardly DIMACS at all, and reading ends. */
const MOST_PROBLEMS = 20;

/**
 * Reads DIMACS CNF. A line that is `%` alone ends the clauses, as in the files of the SATLIB collection.
 * @returns the clauses, or all problems (at most 20) with their lines
 */
export function readDimacs(text: string): DimacsResult {
  const problems: DimacsProblem[] = [];
  const clauses: number[][] = [];
  const comments: string[] = [];
  let header: { readonly variables: number; readonly clauses: number; readonly line: number } | null = null;
  let clause: number[] = [];
  let clauseLine = 0;
  const report = (code: DimacsProblem["code"], line: number, message: string) =>
    problems.push({ code, message, line });

  const lines = text.split(/\r\n|\r|\n/);
  for (let index = 0; index < lines.length && problems.length < MOST_PROBLEMS; index += 1) {
    const content = lines[index]!.trim();
    const line = index + 1;
    if (content === "") continue;
    if (content === "%") break;
    if (/^c(\s|$)/.test(content)) {
      comments.push(content.slice(2));
      continue;
    }
    if (content.startsWith("p")) {
      const numbers = /^p\s+cnf\s+(\d+)\s+(\d+)$/.exec(content);
      if (header !== null)
        report("header-twice", line, `a second header; the first is on line ${header.line}`);
      else if (numbers === null)
        report("bad-header", line, `expected "p cnf VARIABLES CLAUSES", found "${shortened(content)}"`);
      header ??= { variables: Number(numbers?.[1] ?? 0), clauses: Number(numbers?.[2] ?? 0), line };
      if (numbers === null) return { problems };
      continue;
    }
    if (header === null) {
      report("no-header", line, `expected "p cnf VARIABLES CLAUSES" before "${shortened(content)}"`);
      return { problems };
    }
    for (const word of content.split(/\s+/)) {
      const literal = Number(word);
      if (!/^[+-]?\d+$/.test(word) || !Number.isSafeInteger(literal))
        report("not-a-literal", line, `expected a signed whole number, found "${shortened(word)}"`);
      else if (literal === 0) {
        clauses.push(clause);
        clause = [];
      } else if (Math.abs(literal) > header.variables)
        report(
          "variable-out-of-range",
          line,
          `variable ${Math.abs(literal)} in a text of ${header.variables} variables`,
        );
      else {
        if (clause.length === 0) clauseLine = line;
        clause.push(literal);
      }
      if (problems.length >= MOST_PROBLEMS) break;
    }
  }
  if (header === null)
    report("no-header", lines.length, 'expected "p cnf VARIABLES CLAUSES", found no header');
  else if (problems.length === 0) {
    if (clause.length > 0) report("unfinished-clause", clauseLine, "the last clause does not end in 0");
    else if (clauses.length !== header.clauses)
      report(
        "clause-count-differs",
        header.line,
        `the header announces ${header.clauses} clauses, ${clauses.length} follow`,
      );
  }
  return problems.length > 0
    ? { problems }
    : { cnf: { variableCount: header!.variables, clauses, comments } };
}

function shortened(text: string): string {
  return text.length > 40 ? `${text.slice(0, 40)}…` : text;
}
