/**
 * Derivations of the entailments in the collected questions and claims: how many clauses are generated until one is found.
 *
 *     npx tsx tests/benchmarks/derivation.ts [--limit N] [--only ID] [--each]
 *
 * The search for derivations alone, without structures beside it, as it goes through its turns, with at most N generated
 * clauses for each question (10,000 if not said). The figures that are to hold, of the entailments in the questions:
 * 85 % within 1,000 generated clauses, 93 % within 10,000, 97 % within 100,000, 99 % within 1,000,000; of the claims
 * 99 % in all; checking at most a fiftieth of the time of the search. Times are CPU time of this process and good
 * for the ratios within one run. `--each` prints a line for each question.
 */
import { parseArgs } from "node:util";
import type { Derivation, DerivationTask } from "../../lib/derivation/derive.ts";
import { DerivationSearch } from "../../lib/derivation/turns.ts";
import { checkEvidence } from "../../lib/evidence/check.ts";
import type { Evidence } from "../../lib/evidence/format.ts";
import { EvidenceWriter } from "../../lib/inquiry/evidence-writer.ts";
import { Meter, WorkEnded } from "../../lib/logic/meter.ts";
import { Solver } from "../../lib/structures/sat/solver.ts";
import { claims, questions, readSentences } from "../support/corpora.ts";

const { values: options } = parseArgs({
  options: { limit: { type: "string" }, only: { type: "string" }, each: { type: "boolean" } },
});
const limit = Number(options.limit ?? 10_000);

interface Entry {
  readonly id: string;
  readonly premises: readonly string[];
  readonly conclusion: string;
  readonly expected: string;
}

interface Result {
  readonly id: string;
  readonly generated: number;
  readonly searchTime: number;
  readonly checkTime: number;
  /** Null when none was found. */
  readonly lines: number | null;
  readonly result: string;
}

function cpuMilliseconds(): number {
  const { user, system } = process.cpuUsage();
  return (user + system) / 1000;
}

/** The evidence that answers the question which the task is. */
function evidenceOf(task: DerivationTask, derivation: Derivation): Evidence {
  const writer = new EvidenceWriter();
  const question = {
    ask: "entails" as const,
    premises: writer.theory(task.premises),
    conclusion: writer.sentence(task.conclusion!),
  };
  writer.addDerivation(task, derivation);
  return writer.finish(question, "holds");
}

function run({ id, premises, conclusion, expected }: Entry): Result {
  const sentences = readSentences([...premises, conclusion]);
  const task = { premises: sentences.slice(0, -1), conclusion: sentences.at(-1)! };
  const start = cpuMilliseconds();
  const search = new DerivationSearch(task, (onDerived) => new Solver({ observer: { onDerived } }));
  const meter = new Meter(limit);
  let result = "open";
  let derivation: Derivation | null = null;
  try {
    while (!search.done) {
      const outcome = search.next(meter);
      if (outcome.result === "derived") derivation = outcome.derivation;
      if (outcome.result !== "gave-up") result = outcome.result;
    }
  } catch (problem) {
    if (!(problem instanceof WorkEnded)) throw problem;
  }
  const searchTime = cpuMilliseconds() - start;
  let checkTime = 0;
  if (derivation !== null) {
    const evidence = evidenceOf(task, derivation);
    const before = cpuMilliseconds();
    const check = checkEvidence(evidence);
    checkTime = cpuMilliseconds() - before;
    if (!check.accepted) fail(`${id}: the checker rejects the derivation: ${check.reason}`);
  }
  if (result === "derived" && expected !== "holds") fail(`${id}: derived, and ${expected}`);
  if (result === "saturated" && expected === "holds") fail(`${id}: saturated, and it holds`);
  const lines = derivation === null ? null : derivation.record.lines.length;
  if (options.each || options.only !== undefined)
    console.log(
      `${id.padEnd(26)}${result.padEnd(11)}${String(search.generated).padStart(9)} clauses${searchTime.toFixed(1).padStart(10)} ms${String(lines ?? "").padStart(5)}`,
    );
  return { id, generated: search.generated, searchTime, checkTime, lines, result };
}

function fail(message: string): void {
  console.error(message);
  process.exitCode = 1;
}

function quantile(numbers: readonly number[], part: number): number {
  const sorted = [...numbers].sort((a, b) => a - b);
  return sorted[Math.min(sorted.length - 1, Math.floor(sorted.length * part))] ?? Number.NaN;
}

const sum = (numbers: readonly number[]) => numbers.reduce((total, one) => total + one, 0);

function report(name: string, entries: readonly Entry[]): void {
  const wanted = entries.filter(({ id }) => options.only === undefined || id === options.only);
  if (wanted.length === 0) return;
  const results = wanted.map(run);
  const holding = results.filter((_, place) => wanted[place]!.expected === "holds");
  const derived = holding.filter(({ lines }) => lines !== null);
  console.log(`\n${name}: ${derived.length} of ${holding.length} entailments derived`);
  for (const most of [100, 1_000, 10_000, 100_000, 1_000_000])
    if (most <= limit) {
      const count = derived.filter(({ generated }) => generated <= most).length;
      const percent = ((100 * count) / holding.length).toFixed(1);
      const within = most.toLocaleString("en").padStart(9);
      console.log(`  within ${within} clauses: ${String(count).padStart(4)}, ${percent} %`);
    }
  const open = holding.filter(({ lines }) => lines === null).map(({ id }) => id);
  if (open.length > 0) console.log(`  open: ${open.join(" ")}`);
  const others = results.filter((_, place) => wanted[place]!.expected !== "holds");
  const saturated = others.filter(({ result }) => result === "saturated").length;
  console.log(`  of ${others.length} that do not follow, ${saturated} are saturated without a contradiction`);
  const lines = derived.map((result) => result.lines!);
  console.log(
    `  lines: median ${quantile(lines, 0.5)}, nine of ten at most ${quantile(lines, 0.9)}, all at most ${Math.max(...lines)}`,
  );
  const searching = sum(results.map((result) => result.searchTime));
  const checking = sum(results.map((result) => result.checkTime));
  const generated = sum(results.map((result) => result.generated));
  console.log(`  clauses a second: ${((1000 * generated) / searching).toFixed(0)}`);
  console.log(`  time of all checks by time of all searches: ${(checking / searching).toFixed(3)}`);
}

report("questions", questions);
report("claims", claims);
console.log(`\nmemory of the process: ${(process.memoryUsage().rss / 1e6).toFixed(0)} MB`);
