/** Text of a notebook file in, a notebook or a problem out. */
import * as v from "valibot";
import { type Cell, cellSchema, type Notebook, notebookSchema } from "./nbformat.ts";

export type ReadNotebook = { readonly notebook: Notebook } | { readonly problem: string };

/** No notebook needs more levels of brackets; the bound keeps the writing of one from running out of stack. */
const DEEPEST = 200;

/**
 * Reads a notebook of nbformat 4. Keys that the format does not name are kept as they are. Nothing is thrown.
 * @param text the file's content; a byte order mark is passed over
 */
export function readNotebook(text: string): ReadNotebook {
  let value: unknown;
  try {
    value = JSON.parse(text.replace(/^\uFEFF/, ""));
  } catch (error) {
    return { problem: `not a notebook: the file is not JSON (${(error as Error).message})` };
  }
  if (typeof value !== "object" || value === null || Array.isArray(value)) {
    return { problem: "not a notebook: the file is JSON, but no object" };
  }
  const problem = findVersionProblem(value as Record<string, unknown>) ?? findDepthProblem(value);
  if (problem !== null) return { problem };
  const read = v.safeParse(notebookSchema, value);
  if (!read.success) return { problem: `the notebook is malformed: ${describe(read.issues)}` };
  const cells: Cell[] = [];
  for (const [index, cell] of read.output.cells.entries()) {
    const found = findCellProblem(cell);
    if (found !== null) return { problem: `cell ${index + 1} is malformed: ${found}` };
    // The value itself and not the parsed copy, which would lose keys with unusual names.
    cells.push(cell as Cell);
  }
  return { notebook: { ...(value as unknown as Notebook), cells } };
}

function findVersionProblem(value: Record<string, unknown>): string | null {
  const { nbformat, nbformat_minor: minor } = value;
  if (nbformat === undefined) return "not a notebook: nbformat, the version of the format, is missing";
  if (nbformat !== 4) {
    const given = JSON.stringify(nbformat);
    if (typeof nbformat === "number" && nbformat < 4) {
      return `the notebook has the old format nbformat ${given}; convert it to nbformat 4 first`;
    }
    return `the notebook has the unknown format nbformat ${given}; nbformat 4 is read`;
  }
  if (!Number.isSafeInteger(minor) || (minor as number) < 0) {
    return `the notebook is malformed: nbformat_minor: expected a whole number but received ${JSON.stringify(minor)}`;
  }
  return null;
}

function findCellProblem(cell: unknown): string | null {
  const type = (cell as { cell_type?: unknown } | null)?.cell_type;
  if (typeof cell === "object" && cell !== null && !Array.isArray(cell)) {
    if (type === undefined) return "cell_type is missing";
    if (type !== "code" && type !== "markdown" && type !== "raw") {
      return `cell_type is ${JSON.stringify(type)}, where code, markdown or raw is expected`;
    }
  }
  const read = v.safeParse(cellSchema, cell);
  return read.success ? null : describe(read.issues);
}

/** Walks the value with a stack of its own, since the value may be deeper than that of the program. */
function findDepthProblem(value: object): string | null {
  const waiting: { value: object; depth: number }[] = [{ value, depth: 1 }];
  for (let next = waiting.pop(); next !== undefined; next = waiting.pop()) {
    if (next.depth > DEEPEST) return `the notebook is malformed: nested more than ${DEEPEST} levels deep`;
    for (const part of Object.values(next.value)) {
      if (typeof part === "object" && part !== null) waiting.push({ value: part, depth: next.depth + 1 });
    }
  }
  return null;
}

function describe(issues: readonly v.BaseIssue<unknown>[]): string {
  const said = issues.slice(0, 3).map((issue) => {
    const path = v.getDotPath(issue);
    const message = issue.message.replace(/^Invalid \w+: Expected/, "expected");
    return path === null ? message : `${path}: ${message}`;
  });
  return said.join("; ");
}
