/** `twoplace recheck`: the stored evidence of a notebook, verified without searching. */
import { prepareDrawing } from "../display/drawing.ts";
import { counted, displayWidth, padEnd, shorten, visible } from "../display/text.ts";
import { findForeignKernel } from "../notebook/execute.ts";
import { readNotebook } from "../notebook/read.ts";
import { EXIT_FAILED, EXIT_FINE, readInput, UnreadableInput } from "./exit.ts";
import { type Finding, recheckNotebook } from "./recheck-notebook.ts";

/** Columns that a statement may take in the list. */
const STATEMENT_WIDTH = 60;

/**
 * Prints what each stored result came to, and how many of each there are.
 * @returns the exit status: 1 when anything does not hold or has no result
 */
export async function recheck(file: string): Promise<number> {
  const read = readNotebook(await readInput(file));
  if ("problem" in read) throw new UnreadableInput(`cannot recheck ${file}: ${read.problem}`);
  const foreign = findForeignKernel(read.notebook);
  if (foreign !== null)
    throw new UnreadableInput(`cannot recheck ${file}: it is a notebook for the kernel ${foreign}`);
  await prepareDrawing();
  const findings = recheckNotebook(read.notebook);
  process.stdout.write(`${[...listOf(findings), summaryOf(findings)].join("\n")}\n`);
  const failed = findings.filter(isFailure);
  if (failed.length === 0) return EXIT_FINE;
  process.stderr.write(`twoplace: ${file}: ${counted(failed.length, "result")} could not be confirmed\n`);
  return EXIT_FAILED;
}

function isFailure({ outcome }: Finding): boolean {
  return outcome === "does not hold" || outcome === "missing";
}

/** A line for each finding that says more than that a definition reads as before. */
function listOf(findings: readonly Finding[]): readonly string[] {
  const rows = findings
    .filter(({ outcome }) => outcome !== "read again")
    .map(({ cell, text, verdict, outcome, remark }) => [
      `cell ${cell}`,
      shorten(visible(text), STATEMENT_WIDTH),
      visible(verdict ?? ""),
      remark === null ? outcome : `${outcome}: ${visible(remark)}`,
    ]);
  const widths = [0, 1, 2].map((column) => Math.max(0, ...rows.map((row) => displayWidth(row[column]!))));
  return rows.map((row) =>
    row
      .map((text, column) => (column < widths.length ? padEnd(text, widths[column]!) : text))
      .join("  ")
      .trimEnd(),
  );
}

/** `7 results: 4 accepted, 1 open, 1 computed, 1 does not hold; 3 definitions read again`. */
function summaryOf(findings: readonly Finding[]): string {
  const count = (outcome: Finding["outcome"]) =>
    findings.filter((finding) => finding.outcome === outcome).length;
  const outcomes = (["accepted", "open", "computed", "missing", "does not hold"] as const).filter(
    (outcome) => count(outcome) > 0,
  );
  const again = count("read again");
  const results = findings.length - again;
  const told = outcomes.map(
    (outcome) =>
      `${count(outcome)} ${outcome === "does not hold" && count(outcome) > 1 ? "do not hold" : outcome}`,
  );
  const head = counted(results, "result");
  const parts = [told.length === 0 ? head : `${head}: ${told.join(", ")}`];
  if (again > 0) parts.push(`${counted(again, "definition or form", "definitions and forms")} read again`);
  return parts.join("; ");
}
