/**
 * The collected sets that have infinite models only, put to `check-finite` and, in the same run, to z3-solver.
 *
 *     npx tsx tests/benchmarks/infinite.ts [--seconds N] [--steps N] [--only ID] [--dual itself|converse|complement]
 *
 * Twoplace has its budget of steps (200,000 if not said), its checks included; z3-solver gets the axioms as SMT-LIB, with
 * N seconds each (20 if not said; none with 0). Without `--dual` every set is asked three times: as it stands, its
 * converse and its complement; z3-solver is asked once. The figures that are to hold: no finite model for all 42, an
 * infinite one for at least 39, and for all with free terms; the same for the duals; median under 0.3 s a set.
 */
import { parseArgs } from "node:util";
import { checkFinite } from "../../lib/inquiry/check-finite.ts";
import { unwatchedWork } from "../../lib/inquiry/work.ts";
import { printSmtLib } from "../../lib/language/smt-lib.ts";
import { DEFAULT_BUDGET } from "../../lib/logic/meter.ts";
import { complementTheory, converseTheory, type Theory } from "../../lib/logic/theory.ts";
import { infiniteOnly, readTheory } from "../support/corpora.ts";
import { startOracle } from "../support/z3.ts";

const { values: options } = parseArgs({
  options: {
    seconds: { type: "string" },
    steps: { type: "string" },
    only: { type: "string" },
    dual: { type: "string" },
  },
});
const seconds = Number(options.seconds ?? 20);
const budget = Number(options.steps ?? DEFAULT_BUDGET);
const duals: Readonly<Record<string, (theory: Theory) => Theory>> = {
  itself: (theory) => theory,
  converse: converseTheory,
  complement: complementTheory,
};
const entries = infiniteOnly.filter(({ id }) => options.only === undefined || id === options.only);
// As in a kernel that has run a few cells.
for (const { axioms } of entries.slice(0, 10))
  checkFinite(readTheory(axioms), { ...unwatchedWork, budget: 2_000 });

const counts: Record<string, Record<string, number>> = {};
for (const [dual, change] of Object.entries(duals)) {
  if (options.dual !== undefined && options.dual !== dual) continue;
  console.log(
    `\n| set, ${dual} | verdict | no finite model by | infinite model | steps | ms |\n| --- | --- | --- | --- | --- | --- |`,
  );
  const times: number[] = [];
  counts[dual] = { "no finite model": 0, "infinite model": 0, "infinite-only": 0 };
  for (const { id, axioms } of entries) {
    const theory = change(readTheory(axioms));
    const start = performance.now();
    const answer = checkFinite(theory, { ...unwatchedWork, budget });
    const milliseconds = performance.now() - start;
    times.push(milliseconds);
    const { verdict, noFinite, model, steps } = answer;
    const on =
      model === null ? "" : "carrier" in model ? JSON.stringify(model.carrier.description) : "free terms";
    const by = noFinite?.reason.record.principle ?? "";
    console.log(`| ${id} | ${verdict} | ${by} | ${on} | ${steps} | ${milliseconds.toFixed(0)} |`);
    if (noFinite !== null) counts[dual]["no finite model"]! += 1;
    if (model !== null) counts[dual]["infinite model"]! += 1;
    if (verdict === "infinite-only") counts[dual]["infinite-only"]! += 1;
  }
  times.sort((a, b) => a - b);
  console.log(
    `\n${JSON.stringify(counts[dual])} of ${entries.length}; median ${times[Math.floor(times.length / 2)]!.toFixed(1)} ms, most ${times.at(-1)!.toFixed(0)} ms`,
  );
}

if (seconds > 0) {
  const oracle = await startOracle();
  const answers: Record<string, number> = {};
  for (const { axioms } of entries) {
    const { answer } = await oracle.read(
      printSmtLib(readTheory(axioms), null),
      { timeout: seconds * 1000 },
      true,
    );
    const word = answer === 1 ? "a model" : answer === -1 ? "no model" : "unknown";
    answers[word] = (answers[word] ?? 0) + 1;
  }
  console.log(`\nz3-solver, ${seconds} s each: ${JSON.stringify(answers)} of ${entries.length}`);
  oracle.close();
}
