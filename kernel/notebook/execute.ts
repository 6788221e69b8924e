/** Runs a notebook's code cells through a kernel. */
import { v5 as uuidOfName } from "uuid";
import { KERNEL_DISPLAY_NAME, KERNEL_NAME, languageInfo } from "../protocol/kernel-info.ts";
import { type Cell, type CodeCell, joinLines, type Notebook, type Output } from "./nbformat.ts";

/** How a cell's reply ended; as much of an `execute_reply` as is needed here. */
export type CellReply =
  | { readonly status: "ok"; readonly execution_count: number }
  | { readonly status: "aborted"; readonly execution_count: number }
  | {
      readonly status: "error";
      readonly execution_count: number;
      readonly ename: string;
      readonly evalue: string;
    };

/** What runs a cell: a client of a kernel, whatever lies between the two. */
export interface CellRunner {
  /** Runs code as one cell. The outputs may still change while later cells run, if those update a display. */
  execute(code: string): Promise<{ readonly reply: CellReply; readonly outputs: readonly Output[] }>;
}

/** A cell that ended with an error. */
export interface FailedCell {
  /** Counted from 1 among all cells. */
  readonly number: number;
  readonly ename: string;
  readonly evalue: string;
}

export interface ExecutedNotebook {
  readonly notebook: Notebook;
  readonly failed: readonly FailedCell[];
}

/** The kernel that a notebook asks for by name, if it is another one than ours; null otherwise. */
export function findForeignKernel(notebook: Notebook): string | null {
  const { kernelspec } = notebook.metadata as { kernelspec?: { name?: unknown } };
  return typeof kernelspec?.name === "string" && kernelspec.name !== KERNEL_NAME ? kernelspec.name : null;
}

/**
 * Runs all code cells in order and returns the notebook with their outputs, counts and the kernel's metadata; from
 * minor version 5 on, cells without an id, or with that of an earlier cell, get one. Blank cells are not run.
 *
 * A cell that fails does not end the run, unlike with Jupyter's own runner: each claim of a draft stands for itself,
 * and one that is not met must not hide the rest. A failing cell with Jupyter's tag `raises-exception` is not reported
 * as failed.
 * @param onCell told after each code cell that was run
 */
export async function executeNotebook(
  notebook: Notebook,
  runner: CellRunner,
  onCell: (cell: CodeCell, number: number) => void = () => undefined,
): Promise<ExecutedNotebook> {
  const failed: FailedCell[] = [];
  const cells: Cell[] = [];
  for (const [index, cell] of notebook.cells.entries()) {
    if (cell.cell_type !== "code") {
      cells.push(cell);
      continue;
    }
    const source = joinLines(cell.source);
    if (source.trim() === "") {
      cells.push({ ...cell, outputs: [], execution_count: null });
      continue;
    }
    const { reply, outputs } = await runner.execute(source);
    const executed: CodeCell = { ...cell, outputs, execution_count: reply.execution_count };
    cells.push(executed);
    if (reply.status !== "ok" && !mayFail(cell)) failed.push({ number: index + 1, ...mistakeOf(reply) });
    onCell(executed, index + 1);
  }
  const kernelspec = { name: KERNEL_NAME, display_name: KERNEL_DISPLAY_NAME, language: KERNEL_NAME };
  const metadata = { ...notebook.metadata, kernelspec, language_info: languageInfo };
  const identified = notebook.nbformat_minor >= 5 ? addIds(cells) : cells;
  return { notebook: { ...notebook, metadata, cells: identified }, failed };
}

function mistakeOf(reply: CellReply): { ename: string; evalue: string } {
  if (reply.status === "error") return { ename: reply.ename, evalue: reply.evalue };
  return { ename: "Aborted", evalue: "the kernel did not run the cell" };
}

function mayFail(cell: Cell): boolean {
  const { tags } = cell.metadata;
  return Array.isArray(tags) && tags.includes("raises-exception");
}

/** The name space of the ids below, made once at random. */
const CELL_IDS = "7c1d4a0e-5f0b-4d39-9a63-0d8a1f6f2b57";

/** Gives ids that depend on place and text alone, so that a notebook run twice comes out the same. */
function addIds(cells: readonly Cell[]): Cell[] {
  const taken = new Set<string>();
  const given = new Set(cells.map((cell) => cell.id));
  return cells.map((cell, index) => {
    let id = cell.id;
    for (let attempt = 0; id === undefined || taken.has(id); attempt++) {
      const name = `${index} ${attempt} ${joinLines(cell.source)}`;
      const candidate = uuidOfName(name, CELL_IDS).slice(0, 8);
      id = given.has(candidate) ? undefined : candidate;
    }
    taken.add(id);
    return { ...cell, id };
  });
}
