/** `twoplace run`: a notebook, through the kernel protocol, in this process. */
import { rename, rm, writeFile } from "node:fs/promises";
import { basename, dirname, join } from "node:path";
import { executeNotebook, type FailedCell, findForeignKernel } from "../notebook/execute.ts";
import type { CodeCell } from "../notebook/nbformat.ts";
import { readNotebook } from "../notebook/read.ts";
import { writeNotebook } from "../notebook/write.ts";
import { ThreadEvaluator } from "../session/thread.ts";
import { MemoryClient, MemoryKernel } from "../transport/memory.ts";
import { EXIT_FAILED, EXIT_FINE, readInput, UnreadableInput } from "./exit.ts";

/**
 * Executes a notebook, prints what each of its claims came to, and writes the executed notebook.
 * @returns the exit status
 */
export async function runNotebook(file: string, options: { readonly output?: string }): Promise<number> {
  const read = readNotebook(await readInput(file));
  if ("problem" in read) throw new UnreadableInput(`cannot run ${file}: ${read.problem}`);
  const foreign = findForeignKernel(read.notebook);
  if (foreign !== null)
    throw new UnreadableInput(`cannot run ${file}: it is a notebook for the kernel ${foreign}`);
  const evaluator = new ThreadEvaluator();
  const kernel = new MemoryKernel({ evaluator });
  const client = new MemoryClient(kernel.connect());
  process.once("SIGINT", () => kernel.interrupt());
  try {
    const { notebook, failed } = await executeNotebook(read.notebook, client, printClaims);
    await replaceFile(options.output ?? file, writeNotebook(notebook));
    reportFailures(failed);
    return failed.length === 0 ? EXIT_FINE : EXIT_FAILED;
  } finally {
    await kernel.close();
  }
}

/** The result of a statement, as far as it is printed here. */
interface StoredResult {
  readonly statement?: unknown;
  readonly text?: unknown;
  readonly summary?: unknown;
}

/** What the claims and questions of a cell came to, a line each. */
export function printClaims(cell: CodeCell, number: number): void {
  for (const output of cell.outputs) {
    if (output.output_type !== "display_data") continue;
    const { statement, text, summary } = (output.metadata.twoplace ?? {}) as StoredResult;
    if (typeof summary !== "string" || ["relation", "define", "describe"].includes(String(statement)))
      continue;
    process.stdout.write(`cell ${number}: ${String(text).replace(/\s+/g, " ")}\n    ${summary}\n`);
  }
}

function reportFailures(failed: readonly FailedCell[]): void {
  for (const { number, ename, evalue } of failed)
    process.stderr.write(`cell ${number}: ${ename}: ${evalue}\n`);
}

/** Writes a file so that a reader, or a crash, finds the old one or the new one and nothing between. */
async function replaceFile(file: string, text: string): Promise<void> {
  const beside = join(dirname(file), `.${basename(file)}.${process.pid}.part`);
  try {
    await writeFile(beside, text);
    await rename(beside, file);
  } catch (problem) {
    await rm(beside, { force: true });
    throw new UnreadableInput(`cannot write ${file}: ${(problem as Error).message}`);
  }
}
