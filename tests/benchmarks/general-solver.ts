/**
 * The collected questions and claims, put to Twoplace and to z3-solver in one run.
 *
 *     npx tsx tests/benchmarks/general-solver.ts [--seconds N] [--steps N] [--each]
 *
 * Twoplace answers `T ⊨ φ` within its budget of steps (200,000 if not said), its checks included; z3-solver gets the same
 * question as SMT-LIB, with N seconds (2 if not said). The figures that are to hold: at least 12 % of all questions
 * more, none left open that z3-solver settles in a second, median time at most a tenth of its. Times are for the ratios
 * within the run, from the text of the question in the form that each reads. Every third question is put to both before that, since a
 * kernel's code is warm after its first cells, and so is WebAssembly.
 */
import { parseArgs } from "node:util";
import { askEntails } from "../../lib/inquiry/claims.ts";
import { DEFAULT_LARGEST_SYMMETRIC_SIZE, unwatchedWork } from "../../lib/inquiry/work.ts";
import { printSmtLib } from "../../lib/language/smt-lib.ts";
import { DEFAULT_BUDGET } from "../../lib/logic/meter.ts";
import { claims, questions, readSentences, theoryOf } from "../support/corpora.ts";
import { startOracle } from "../support/z3.ts";

const { values: options } = parseArgs({
  options: { seconds: { type: "string" }, steps: { type: "string" }, each: { type: "boolean" } },
});
const seconds = Number(options.seconds ?? 2);
const budget = Number(options.steps ?? DEFAULT_BUDGET);
/** Milliseconds within which z3-solver settles nothing that Twoplace leaves open. */
const SOON = 1_000;

interface Outcome {
  readonly verdict: "holds" | "fails" | "open";
  readonly milliseconds: number;
}

const oracle = await startOracle();

async function askZ3(text: string): Promise<Outcome> {
  const { answer, milliseconds } = await oracle.read(text, { timeout: seconds * 1000 }, true);
  return { verdict: answer === -1 ? "holds" : answer === 1 ? "fails" : "open", milliseconds };
}

interface Row {
  readonly id: string;
  readonly expected: string;
  readonly ours: Outcome;
  readonly theirs: Outcome;
}

type Entry = Pick<Row, "id" | "expected"> & {
  readonly premises: readonly string[];
  readonly conclusion: string;
};

function askTwoplace({ premises, conclusion }: Entry, steps: number): Outcome {
  const start = performance.now();
  const [sentence, ...others] = readSentences([conclusion, ...premises]);
  const work = { ...unwatchedWork, budget: steps, symmetricUpTo: DEFAULT_LARGEST_SYMMETRIC_SIZE };
  const { verdict } = askEntails(theoryOf(others), sentence!, work);
  return { verdict, milliseconds: performance.now() - start };
}

function smtLibOf({ premises, conclusion }: Entry): string {
  const [sentence, ...others] = readSentences([conclusion, ...premises]);
  return printSmtLib(theoryOf(others), sentence!);
}

const entries: readonly Entry[] = [...questions, ...claims];
const warming = entries.filter((_, place) => place % 3 === 0);
const WARMING_STEPS = 2_000;
// One after the other, so that the threads of one do not take the time of the other.
for (const entry of warming) askTwoplace(entry, WARMING_STEPS);
const answers = entries.map((entry) => askTwoplace(entry, budget));
for (const entry of warming) await askZ3(smtLibOf(entry));
const rows: Row[] = [];
for (const [place, entry] of entries.entries()) {
  const { id, expected } = entry;
  const [ours, theirs] = [answers[place]!, await askZ3(smtLibOf(entry))];
  rows.push({ id, expected, ours, theirs });
  if (options.each)
    console.log(
      `${id}: ${expected}; Twoplace ${ours.verdict} ${ours.milliseconds.toFixed(1)} ms; z3-solver ${theirs.verdict} ${theirs.milliseconds.toFixed(1)} ms`,
    );
}

const isWrong = ({ verdict }: Outcome, expected: string) =>
  verdict !== "open" && verdict !== (expected === "only infinite countermodels" ? "fails" : expected);
const settled = (of: (row: Row) => Outcome, some: readonly Row[] = rows) =>
  some.filter((row) => of(row).verdict !== "open").length;
const ours = ({ ours: outcome }: Row) => outcome;
const theirs = ({ theirs: outcome }: Row) => outcome;

function median(numbers: readonly number[]): number {
  return [...numbers].sort((a, b) => a - b)[Math.floor(numbers.length / 2)]!;
}

console.log(`${rows.length} entailments; Twoplace ${budget} steps, z3-solver ${seconds} s each\n`);
console.log("| | Twoplace | z3-solver |\n| --- | --- | --- |");
const line = (name: string, some: readonly Row[]) =>
  console.log(`| ${name} (${some.length}) | ${settled(ours, some)} | ${settled(theirs, some)} |`);
line("all", rows);
for (const expected of ["holds", "fails", "only infinite countermodels"])
  line(
    expected,
    rows.filter((row) => row.expected === expected),
  );
const wrong = (of: (row: Row) => Outcome) => rows.filter((row) => isWrong(of(row), row.expected));
console.log(`| wrong | ${wrong(ours).length} | ${wrong(theirs).length} |`);
const both = rows.filter((row) => ours(row).verdict !== "open" && theirs(row).verdict !== "open");
const [mine, other] = [ours, theirs].map((of) => median(both.map((row) => of(row).milliseconds)));
console.log(`| median where both answer | ${mine!.toFixed(2)} ms | ${other!.toFixed(2)} ms |`);
const more = (100 * (settled(ours) - settled(theirs))) / rows.length;
console.log(`\n${more.toFixed(1)} % of all more; median time ${(mine! / other!).toFixed(3)} of z3-solver's`);
const missed = rows.filter(
  (row) => ours(row).verdict === "open" && theirs(row).verdict !== "open" && theirs(row).milliseconds <= SOON,
);
console.log(
  `left open though z3-solver settles it within ${SOON} ms: ${missed.map(({ id }) => id).join(", ") || "none"}`,
);
for (const [name, of] of [["Twoplace", ours] as const, ["z3-solver", theirs] as const])
  if (wrong(of).length > 0) console.log(`wrong, ${name}: ${wrong(of).map(({ id }) => id)}`);
oracle.close();
process.exitCode = wrong(ours).length + missed.length === 0 ? 0 : 1;
