/**
 * The propositional solver against native `minisat` on encodings of structures.
 *
 *     npx tsx tests/benchmarks/sat.ts [part of a name] [--hard | --small] [--no-preprocessing]
 *
 * Both solvers get the same clauses in the same run and are measured in CPU time, user and system, of all threads.
 * Ours: in this process, from clauses in memory to the answer, after one run to warm up; the mean of as many runs as
 * take about half a second, at most 20. Native: whole processes on a DIMACS file, by the shell's `time`, the mean
 * over as many; the time of a process on an empty file is taken off in the column `solving`. Ratios are ours by
 * native; the one to look at is `solving`. Instances that take native `minisat` less than 2 ms beyond its start are
 * listed and left out of the means of that column, where they would only measure the shell. By default `minisat`
 * eliminates variables before it searches, which we do not; `--no-preprocessing` turns that off.
 */
import { mkdtempSync, rmSync, writeFileSync } from "node:fs";
import { tmpdir } from "node:os";
import { join } from "node:path";
import { Meter } from "../../lib/logic/meter.ts";
import { printDimacs } from "../../lib/structures/sat/dimacs.ts";
import { Solver } from "../../lib/structures/sat/solver.ts";
import { type EncodedClauses, encode, encodings } from "../support/sat-encodings.ts";
import { hasNativeSolver, NATIVE_PACKAGE, solveNatively, timeNatively } from "../support/sat-native.ts";

const LEAST_SOLVING = 2;
const TARGET_TIME = 500;
const MOST_RUNS = 20;

function solveOurs(problem: EncodedClauses): { answer: string; conflicts: number } {
  const solver = new Solver();
  for (let variable = 0; variable < problem.variableCount; variable += 1) solver.newVariable();
  for (const clause of problem.clauses) solver.addClause(clause);
  const answer = solver.solve(new Meter(Number.MAX_SAFE_INTEGER / 1000));
  return { answer, conflicts: solver.counts.conflicts };
}

function cpuOf(work: () => void): number {
  const before = process.cpuUsage();
  work();
  const { user, system } = process.cpuUsage(before);
  return (user + system) / 1000;
}

const geometricMean = (ratios: readonly number[]) =>
  Math.exp(ratios.reduce((sum, ratio) => sum + Math.log(ratio), 0) / ratios.length);

if (!hasNativeSolver()) {
  console.error(`minisat is not installed (Debian package ${NATIVE_PACKAGE})`);
  process.exit(2);
}
const words = process.argv.slice(2);
const part = words.find((word) => !word.startsWith("--")) ?? "";
const chosen = encodings.filter(
  (encoding) =>
    `${encoding.name} on ${encoding.points}`.includes(part) &&
    (!words.includes("--hard") || encoding.level === "hard") &&
    (!words.includes("--small") || encoding.level === "small"),
);
const folder = mkdtempSync(join(tmpdir(), "sat-"));
const empty = join(folder, "empty.cnf");
writeFileSync(empty, printDimacs(0, []));
const option = words.includes("--no-preprocessing") ? "-no-pre" : "-verb=0";
const start = timeNatively(empty, 50, option);
console.log(`native start: ${start.toFixed(2)} ms; times in ms of CPU`);
console.log(`${"".padEnd(52)}answer  conflicts     ours   native  solving   ratio`);
const solving: number[] = [];
const whole: number[] = [];
const byLevel = new Map<string, number[]>();
for (const encoding of chosen) {
  const problem = encode(encoding);
  const file = join(folder, "problem.cnf");
  writeFileSync(file, printDimacs(problem.variableCount, problem.clauses, [problem.name]));
  let first = { answer: "", conflicts: 0 };
  const warm = cpuOf(() => {
    first = solveOurs(problem);
  });
  const runs = Math.max(1, Math.min(MOST_RUNS, Math.round(TARGET_TIME / warm)));
  const ours =
    cpuOf(() => {
      for (let run = 0; run < runs; run += 1) solveOurs(problem);
    }) / runs;
  const native = timeNatively(file, runs, option);
  const answer = solveNatively(file);
  const beyond = native - start;
  const counts = beyond >= LEAST_SOLVING;
  whole.push(ours / native);
  if (counts) {
    solving.push(ours / beyond);
    byLevel.set(encoding.level, [...(byLevel.get(encoding.level) ?? []), ours / beyond]);
  }
  const expected =
    encoding.expected === null
      ? first.answer
      : encoding.expected.satisfiable
        ? "satisfiable"
        : "unsatisfiable";
  const wrong = answer !== first.answer || expected !== first.answer;
  console.log(
    problem.name.padEnd(52) +
      (wrong ? "WRONG" : first.answer === "satisfiable" ? "yes" : "no").padEnd(6) +
      String(first.conflicts).padStart(11) +
      ours.toFixed(1).padStart(9) +
      native.toFixed(1).padStart(9) +
      (counts ? beyond.toFixed(1) : "–").padStart(9) +
      (counts ? (ours / beyond).toFixed(2) : "–").padStart(8),
  );
  if (wrong) process.exitCode = 1;
}
rmSync(folder, { recursive: true });
for (const [level, ratios] of byLevel)
  console.log(`geometric mean, ${level}: ${geometricMean(ratios).toFixed(2)} (${ratios.length} instances)`);
console.log(
  `geometric mean of ours / solving: ${geometricMean(solving).toFixed(2)} (${solving.length} instances)`,
);
console.log(
  `geometric mean of ours / whole process: ${geometricMean(whole).toFixed(2)} (${whole.length} instances)`,
);
