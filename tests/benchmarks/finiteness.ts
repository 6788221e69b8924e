/**
 * Reasons why there is no finite model: steps and CPU time until one is derived, no model being known.
 *
 *     npx tsx tests/benchmarks/finiteness.ts [--steps N] [--only ID] [--each]
 *
 * For infinite-only.json, its converses and complements, the entailments with only infinite countermodels, and the
 * same sets said in other signatures; with at most N steps for each set (60,000 if not said). `--each` prints a line for
 * each set. Times are CPU time of this process and good for the ratios within one run.
 */
import { parseArgs } from "node:util";
import { FinitenessSearch } from "../../lib/inquiry/finiteness/search.ts";
import { printFormula } from "../../lib/language/printer.ts";
import { type Formula, usesIdentity } from "../../lib/logic/formula.ts";
import { Meter, WorkEnded } from "../../lib/logic/meter.ts";
import { complementTheory, converseFormula, sentencesOf, signatureOf } from "../../lib/logic/theory.ts";
import { theoryOf } from "../support/corpora.ts";
import {
  type AxiomSet,
  refutable,
  variants,
  withoutFinite,
  withoutIdentity,
} from "../support/finiteness-sets.ts";

const { values: options } = parseArgs({
  options: { steps: { type: "string" }, only: { type: "string" }, each: { type: "boolean" } },
});
const limit = Number(options.steps ?? 60_000);

function changed(change: (axioms: readonly Formula[]) => readonly Formula[]): readonly AxiomSet[] {
  return withoutFinite.map(({ id, axioms }) => ({ id, axioms: change(axioms) }));
}

const groups: Readonly<Record<string, readonly AxiomSet[]>> = {
  "infinite-only.json": withoutFinite,
  converses: changed((axioms) => axioms.map(converseFormula)),
  complements: changed((axioms) => sentencesOf(complementTheory(theoryOf(axioms)))),
  "only infinite countermodels": refutable("only infinite countermodels"),
  ...Object.fromEntries(Object.entries(variants).map(([name, change]) => [name, changed(change)])),
  "without identity": withoutFinite
    .filter(({ axioms }) => axioms.some(usesIdentity))
    .map(({ id, axioms }) => ({ id, axioms: withoutIdentity(axioms) })),
};

function quantile(numbers: readonly number[], part: number): number {
  return numbers.toSorted((a, b) => a - b)[Math.min(numbers.length - 1, Math.floor(numbers.length * part))]!;
}

for (const [name, sets] of Object.entries(groups)) {
  const results = sets
    .filter(({ id }) => options.only === undefined || options.only === id)
    .map(({ id, axioms }) => {
      const search = new FinitenessSearch(
        axioms,
        signatureOf(axioms, { name: "R", places: 2, infix: false }),
      );
      const meter = new Meter(limit);
      const start = process.cpuUsage();
      let found: ReturnType<FinitenessSearch["advance"]> = null;
      try {
        found = search.advance(Number.POSITIVE_INFINITY, meter, null);
      } catch (problem) {
        if (!(problem instanceof WorkEnded)) throw problem;
      }
      const { user, system } = process.cpuUsage(start);
      const time = (user + system) / 1000;
      if (options.each === true) {
        const { record, relation, domain } = found?.reason ?? {};
        const reason =
          found === null
            ? "open"
            : `${record!.principle}: ${printFormula(relation!, "ascii")} on ${printFormula(domain!, "ascii")}`;
        console.log(`${id}  ${meter.steps} steps  ${time.toFixed(0)} ms  ${search.tried} tried  ${reason}`);
      }
      return { id, found: found !== null, steps: meter.steps, time };
    });
  if (results.length === 0) continue;
  const open = results.filter(({ found }) => !found).map(({ id }) => id);
  const steps = results.map((one) => one.steps);
  const times = results.map(({ time }) => time);
  console.log(
    `${name}: ${results.length - open.length} of ${results.length}` +
      `, steps ${quantile(steps, 0.5)} at the median, ${quantile(steps, 0.9)} at 90 %` +
      `, ms ${quantile(times, 0.5).toFixed(1)}, ${quantile(times, 0.9).toFixed(1)}` +
      `${open.length === 0 ? "" : `; open: ${open.join(", ")}`}`,
  );
}
