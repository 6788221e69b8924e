/**
 * Evidence of 200 derivations and 100 structures from the collected questions, changed in one place after another:
 * what is wrong after a change is rejected. The judge knows nothing of the checker: it tries small structures.
 */
import { describe, expect, it } from "vitest";
import { checkEvidence } from "../lib/evidence/check.ts";
import { digestOf } from "../lib/evidence/digest.ts";
import type { ClauseRecord, DerivationFact, Evidence, FormulaRecord } from "../lib/evidence/format.ts";
import { askEntails } from "../lib/inquiry/claims.ts";
import { unwatchedWork } from "../lib/inquiry/work.ts";
import { clauseForm } from "../lib/logic/records/clause-form.ts";
import { substituteInClause } from "../lib/logic/records/formulas.ts";
import { miniscopeFormula, unfoldFormula } from "../lib/logic/records/made-formulas.ts";
import { changes, wordsIn } from "./support/changes.ts";
import { claims, questions, readSentences, theoryOf } from "./support/corpora.ts";
import { type Interpretation, isRight, isTrueClause } from "./support/evidence-judge.ts";

const seed = Number(process.env.TWOPLACE_SEED ?? 20261201);
const random = randomFrom(seed);
const work = { ...unwatchedWork, budget: 3_000, upTo: 5 };

/** Changes that are tried of each evidence, about. */
const CHANGES = 150;
/** Structures and choices of points for each line of a derivation that was changed and accepted. */
const TRIALS = 20;

/** Numbers from 0 to below 1, the same for the same seed (a linear congruential generator). */
function randomFrom(start: number): () => number {
  let state = start >>> 0;
  return () => {
    state = (Math.imul(state, 1664525) + 1013904223) >>> 0;
    return state / 2 ** 32;
  };
}

/**
 * Evidence of so many derivations and structures: of the collected questions as they are, then of the premises of each
 * with the conclusion of another.
 */
function collect(wanted: Readonly<Record<"holds" | "fails", number>>): Record<"holds" | "fails", Evidence[]> {
  const found: Record<"holds" | "fails", Evidence[]> = { holds: [], fails: [] };
  const entries = [...questions, ...claims].filter(
    ({ expected }) => expected !== "only infinite countermodels",
  );
  for (let apart = 0; found.holds.length < wanted.holds || found.fails.length < wanted.fails; apart += 1)
    for (const [index, { premises }] of entries.entries()) {
      const { conclusion } = entries[(index + apart) % entries.length]!;
      const sentences = readSentences([...premises, conclusion]);
      const { evidence } = askEntails(theoryOf(sentences.slice(0, -1)), sentences.at(-1)!, work);
      if (evidence === null || JSON.stringify(evidence).length > 20_000) continue;
      const verdict = evidence.verdict as "holds" | "fails";
      if (found[verdict].length < wanted[verdict]) found[verdict].push(evidence);
    }
  return found;
}

/** A sample of changed copies: words give way to some of those that the evidence has, and to strangers. */
function sampleOf(evidence: Evidence): Evidence[] {
  const words = [...wordsIn(evidence), "d", "0.0", "", 1];
  const pick = () => words[Math.floor(random() * words.length)];
  const all = [...changes(evidence, () => [pick(), pick(), pick()])] as Evidence[];
  const rate = CHANGES / all.length;
  return all.filter(() => random() < rate);
}

/** Relations and functions that have any values whatever, which stay the same when asked for again. */
function randomInterpretation(size: number): Interpretation {
  const known = new Map<string, number>();
  const value = (name: string, points: readonly number[], values: number) => {
    const key = `${name}(${points})`;
    const result = known.get(key) ?? Math.floor(random() * values);
    known.set(key, result);
    return result;
  };
  return {
    size,
    holds: (relation, points) => value(`${relation}?`, points, 2) === 1,
    value: (name, points) => value(name, points, size),
  };
}

/** The formulas of a derivation that was accepted, by number. */
function formulasOf(fact: DerivationFact, sentences: readonly FormulaRecord[]): readonly FormulaRecord[] {
  const formulas = fact.premises.map((index) => sentences[index]!);
  if (fact.conclusion !== null) formulas.push(["not", sentences[fact.conclusion]!]);
  for (const made of fact.made)
    switch (made[0]) {
      case "define": {
        const [, name, parameters, body] = made;
        const meaning: FormulaRecord = ["iff", ["is", name, ...parameters], body];
        formulas.push(parameters.reduceRight<FormulaRecord>((inner, x) => ["forall", x, inner], meaning));
        break;
      }
      case "unfold":
        formulas.push(unfoldFormula(formulas[made[1]]!, formulas[made[2]]!)!);
        break;
      case "fold":
        formulas.push(made[3]);
        break;
      case "miniscope":
        formulas.push(miniscopeFormula(formulas[made[1]]!));
    }
  return formulas;
}

/** The first line that is not a consequence of those it names, in some structure for some points; −1 when none is found. */
function firstWrongLine(fact: DerivationFact, sentences: readonly FormulaRecord[]): number {
  const formulas = formulasOf(fact, sentences);
  const clauses: ClauseRecord[] = [];
  return fact.lines.findIndex((line) => {
    const clause = line[0] === "clause" ? clauseForm(formulas[line[1]]!, line[1])[line[2]]! : line[1];
    const instances =
      line[0] === "infer"
        ? line[2].map(([used, terms]) => substituteInClause(clauses[used]!, new Map(Object.entries(terms))))
        : [];
    clauses.push(clause);
    if (line[0] === "clause") return false;
    return Array.from({ length: TRIALS }).some((_, trial) => {
      const over = randomInterpretation(2 + (trial % 2));
      const points = new Map<string, number>();
      const values = {
        get: (name: string) => {
          const point = points.get(name) ?? Math.floor(random() * over.size);
          points.set(name, point);
          return point;
        },
      };
      return (
        instances.every((instance) => isTrueClause(instance, over, values)) &&
        !isTrueClause(clause, over, values)
      );
    });
  });
}

describe(`changed evidence of the collected questions (seed ${seed})`, () => {
  const found = collect({ holds: 200, fails: 100 });

  it.each<"holds" | "fails">(["holds", "fails"])("%s", (verdict) => {
    const evidences = found[verdict];
    let [tried, accepted] = [0, 0];
    for (const evidence of evidences) {
      expect(checkEvidence(evidence)).toMatchObject({ accepted: true });
      for (const changed of sampleOf(evidence)) {
        const { sentences, question } = changed;
        // With the digest made to fit again, the content itself must be wrong.
        const isWhole = sentences !== undefined && question !== undefined && question !== null;
        const fitting = isWhole ? { ...changed, digest: digestOf(sentences, question) } : changed;
        tried += 1;
        if (!checkEvidence(fitting).accepted) continue;
        accepted += 1;
        if (!isRight(fitting)) expect.fail(`accepted though wrong: ${JSON.stringify(fitting)}`);
        for (const fact of fitting.facts)
          if (fact.fact === "derivation" && firstWrongLine(fact, sentences) >= 0)
            expect.fail(`accepted with a wrong line: ${JSON.stringify(fact)}`);
      }
    }
    console.log(
      `${evidences.length} that say ${verdict}: ${tried} changes, ${accepted} harmless ones accepted`,
    );
    expect(accepted).toBeLessThan(tried / 3);
  });
});
