/**
 * Counting models: against `clingo-wasm` on the same clauses, and how the cost grows with the number of points.
 *
 *     npx tsx tests/benchmarks/counting.ts [--table]
 *
 * CPU time, user and system, all in this process, one after the other in the same run; each figure is the median of
 * eleven runs after ten to warm up. clingo gets the clauses that our count of labelled models lays out, both ways, as a
 * choice for each variable and a constraint for each clause, and is asked for the number of all answers projected on
 * the table, without printing them. The figures that are to hold:
 * labelled partial orders on 6 points (130,023; OEIS A001035) in at most 0.4 of clingo's time, and partial orders on 7
 * points up to isomorphism (2,045; OEIS A000112) in at most 1.3 times that labelled count. `--table` adds, for
 * some sorts of relation, what each number of points costs.
 */
import { createRequire } from "node:module";
import { Points } from "../../lib/carriers/points.ts";
import type { Formula } from "../../lib/logic/formula.ts";
import { Meter } from "../../lib/logic/meter.ts";
import { ClauseList } from "../../lib/structures/components.ts";
import { countLabelled, countStructures } from "../../lib/structures/count.ts";
import { layOut } from "../../lib/structures/search.ts";
import { readSentences } from "../support/corpora.ts";
import { publishedCounts } from "../support/counting.ts";

const WARM = 10;
const RUNS = 11;
/** Steps beyond which the table does not go on. */
const TABLE_BUDGET = 200_000;

const relations = [{ name: "R", places: 2, infix: false }];
const partialOrder = readSentences([
  "forall x. R(x,x)",
  "forall x y. R(x,y) & R(y,x) -> x = y",
  "forall x y z. R(x,y) & R(y,z) -> R(x,z)",
]);
const unbounded = () => new Meter(Number.MAX_SAFE_INTEGER / 1000);

function cpuOf(work: () => void): number {
  const before = process.cpuUsage();
  work();
  const { user, system } = process.cpuUsage(before);
  return (user + system) / 1000;
}

function median(work: () => void): number {
  for (let run = 0; run < WARM; run += 1) work();
  const times = Array.from({ length: RUNS }, () => cpuOf(work)).sort((a, b) => a - b);
  return times[RUNS >> 1]!;
}

function expectNumber(what: string, got: bigint | number | null, wanted: number): void {
  if (got !== null && BigInt(got) === BigInt(wanted)) return;
  console.error(`${what}: ${got} instead of ${wanted}`);
  process.exitCode = 1;
}

/** The clauses of a labelled count as a logic program. */
function programOf(size: number, sentences: readonly Formula[]): string {
  const list = new ClauseList(unbounded());
  const { variables } = layOut(
    { carrier: new Points(size), sentences, relations },
    list,
    unbounded(),
    true,
    false,
  );
  const lines = [`{v(1..${list.variableCount})}.`];
  for (const clause of list.clauses)
    lines.push(`:- ${clause.map((l) => (l > 0 ? `not v(${l})` : `v(${-l})`)).join(", ")}.`);
  for (const variable of variables[0]!) lines.push(`#project v(${variable}).`);
  return lines.join("\n");
}

async function compareWithClingo(): Promise<void> {
  // A CommonJS module whose types claim named exports. It prints through console.info.
  const clingo: typeof import("clingo-wasm") = createRequire(import.meta.url)("clingo-wasm");
  const info = console.info;
  console.info = () => undefined;
  const run = await clingo.init({ singleThreaded: true });
  const program = programOf(6, partialOrder);
  const theirs = (options: string[]) =>
    median(() => {
      const result = run(program, 0, options);
      expectNumber("clingo", result.Result === "ERROR" ? null : result.Models.Number, 130_023);
    });
  const projected = theirs(["--quiet=2", "--project=project"]);
  const plain = theirs(["--quiet=2"]);
  console.info = info;
  const labelled = median(() => {
    const counted = countLabelled({ size: 6, sentences: partialOrder, relations }, unbounded());
    expectNumber("labelled", counted.labelled, 130_023);
  });
  const classes = median(() => {
    const counted = countStructures({ size: 7, sentences: partialOrder, relations }, unbounded());
    expectNumber("labelled on 7, from the classes", counted.labelled, 6_129_859);
    expectNumber("classes", counted.unlabelled, 2045);
  });
  const show = (what: string, time: number, ratio: string) =>
    console.log(what.padEnd(70) + time.toFixed(1).padStart(8) + ratio.padStart(8));
  console.log(`${"CPU milliseconds".padEnd(70)}${"".padStart(8)}${"ratio".padStart(8)}`);
  show("clingo: 130,023 labelled partial orders on 6 points, projected", projected, "");
  show("the same without projection (clauses have no further variables)", plain, "");
  show("ours, as a ratio to the first (to be at most 0.4)", labelled, (labelled / projected).toFixed(2));
  show("ours, as a ratio to the second", labelled, (labelled / plain).toFixed(2));
  show(
    "ours: 2,045 classes on 7 points, by ours above (at most 1.3)",
    classes,
    (classes / labelled).toFixed(2),
  );
}

/** For some sorts of relation: numbers, steps and time by number of points, until the budget ends. */
function printTable(): void {
  const chosen = [
    "a-count-all",
    "a-count-transitive",
    "a-count-partialorder",
    "a-count-tournament",
    "a-count-symmetric",
    "a-count-equivalence",
    "a-count-ferrers",
    "a-count-dense",
    "a-count-rserial",
  ];
  console.log(
    `\n${"".padEnd(46)}${"points".padStart(7)}${"classes".padStart(9)}${"labelled".padStart(14)}${"steps".padStart(9)}${"ms".padStart(8)}${"labelled alone: steps".padStart(24)}${"ms".padStart(8)}`,
  );
  for (const entry of publishedCounts.filter(({ id }) => chosen.includes(id)))
    for (let size = 3; size <= 9; size += 1) {
      const task = { size, sentences: entry.sentences, relations };
      const meter = new Meter(TABLE_BUDGET);
      const second = new Meter(TABLE_BUDGET);
      let counted = countStructures(task, new Meter(1));
      const time = cpuOf(() => {
        counted = countStructures(task, meter);
      });
      let alone = countLabelled(task, new Meter(1));
      const aloneTime = cpuOf(() => {
        alone = countLabelled(task, second);
      });
      console.log(
        entry.name.padEnd(46) +
          String(size).padStart(7) +
          String(counted.unlabelled ?? "–").padStart(9) +
          String(counted.labelled ?? "–").padStart(14) +
          String(meter.steps).padStart(9) +
          time.toFixed(0).padStart(8) +
          (alone.ended === null ? String(second.steps) : "–").padStart(24) +
          (alone.ended === null ? aloneTime.toFixed(0) : "–").padStart(8),
      );
      if (counted.ended !== null) break;
    }
}

async function main(): Promise<void> {
  await compareWithClingo();
  if (process.argv.includes("--table")) printTable();
}

void main();
