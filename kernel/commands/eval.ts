/** `twoplace eval`: the text of one cell, from a file or standard input. */
import type { CellEvent, CellOutcome, Evaluator, StatementResult } from "../session/evaluator.ts";
import { ThreadEvaluator } from "../session/thread.ts";
import { EXIT_FAILED, EXIT_FINE, readInput } from "./exit.ts";

/** @returns the exit status */
export async function evaluateText(file: string, options: { readonly json: boolean }): Promise<number> {
  const text = await readInput(file);
  const evaluator: Evaluator = new ThreadEvaluator();
  // The first interrupt asks the search to stop and keeps what was done; a second one ends the process.
  process.once("SIGINT", () => evaluator.interrupt());
  try {
    const outcome = await evaluator.runCell(text, options.json ? () => undefined : printEvent);
    if (options.json) process.stdout.write(printResults(outcome.results));
    if (outcome.status === "error") reportError(outcome);
    return outcome.status === "ok" ? EXIT_FINE : EXIT_FAILED;
  } finally {
    await evaluator.close();
  }
}

/** One array, with an object for each statement on a line of its own. */
function printResults(results: readonly StatementResult[]): string {
  return `[\n${results.map((result) => JSON.stringify(result)).join(",\n")}\n]\n`;
}

/** Results go out one after another; progress goes to the terminal, where there is one. */
function printEvent(event: CellEvent): void {
  if (event.kind === "stream") {
    process[event.name].write(event.text);
    return;
  }
  const text = event.data["text/plain"] ?? "";
  const isResult = "twoplace" in event.metadata;
  const eraseLine = "\r\u001b[K";
  if (isResult) process.stdout.write(`${text.trimEnd()}\n\n`);
  if (process.stderr.isTTY) process.stderr.write(isResult ? eraseLine : `${eraseLine}${text.trimEnd()}`);
}

function reportError(outcome: CellOutcome & { status: "error" }): void {
  process.stderr.write(`${outcome.traceback.join("\n")}\n`);
}
