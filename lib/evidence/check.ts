/**
 * The checker: accepts evidence only when every fact in it is true and the facts bear out the verdict. It does not
 * search, and trusts nothing that a search has written. What it relies on is this folder, `lib/carriers` and
 * `lib/logic`.
 */
import type { Formula } from "../logic/formula.ts";
import { Meter, WorkEnded } from "../logic/meter.ts";
import { isTrueIn } from "./evaluate.ts";
import type { Evidence, Fact, QuestionRecord, SentenceIndex, TheoryRecord, VerdictRecord } from "./format.ts";
import { Rejected, readEvidence, reject } from "./read.ts";
import { digestOf } from "./record.ts";

export type CheckResult =
  | { readonly accepted: true; readonly steps: number }
  | { readonly accepted: false; readonly reason: string };

/**
 * Checks evidence of any origin.
 * @param meter bounds the check; when it ends, the evidence is not accepted
 */
export function checkEvidence(
  value: unknown,
  meter: Meter = new Meter(Number.POSITIVE_INFINITY),
): CheckResult {
  try {
    const { evidence, formulas } = readEvidence(value);
    if (evidence.digest !== digestOf(evidence.sentences, evidence.question))
      reject("the digest is not that of the question");
    for (const [index, fact] of evidence.facts.entries()) checkFact(fact, `fact ${index}`, formulas, meter);
    if (!isBorneOut(evidence, formulas, meter))
      reject(`the facts do not bear out the verdict ${JSON.stringify(evidence.verdict)}`);
    return { accepted: true, steps: meter.steps };
  } catch (problem) {
    if (problem instanceof Rejected) return { accepted: false, reason: problem.message };
    if (problem instanceof WorkEnded)
      return { accepted: false, reason: `the check ended early: ${problem.reason}` };
    throw problem;
  }
}

function checkFact(fact: Fact, at: string, formulas: readonly Formula[], meter: Meter): void {
  for (const index of fact.holds)
    if (!isTrueIn(fact.structure, formulas[index]!, meter))
      reject(`${at}: sentence ${index} is said to hold in the structure and does not`);
  if (fact.fails?.every((index) => isTrueIn(fact.structure, formulas[index]!, meter)))
    reject(`${at}: sentences ${fact.fails.join(", ")} are said to fail in the structure and all hold`);
}

/** Whether the verdict is one that the facts, all of them true, support. */
function isBorneOut(
  { question, verdict, facts }: Evidence,
  formulas: readonly Formula[],
  meter: Meter,
): boolean {
  const shown = new Shown(facts);
  switch (question.ask) {
    case "entails":
      return verdict === "fails" && shown.separates(question.premises, [question.conclusion]);
    case "does-not-entail":
      return verdict === "holds" && shown.separates(question.premises, [question.conclusion]);
    case "true-in":
    case "false-in": {
      const value = isTrueIn(question.structure, formulas[question.sentence]!, meter);
      return verdict === (value === (question.ask === "true-in") ? "holds" : "fails");
    }
    case "consistent":
      return verdict === "holds" && shown.model(question.axioms);
    case "infinite-only":
    case "no-finite-model":
      return verdict === "fails" && shown.finiteModel(question.axioms);
    case "check-finite":
      return verdict === "finite" && shown.finiteModel(question.axioms);
    case "weaker":
      // Weaker: what it says follows from the other. A model of the right theory alone refutes that.
      return verdict === "fails" && shown.separates(question.right, question.left);
    case "equivalent":
      return (
        verdict === "fails" &&
        (shown.separates(question.left, question.right) || shown.separates(question.right, question.left))
      );
    case "independent":
      return (
        verdict === "holds" &&
        question.axioms.every((axiom, place) => shown.separates(without(question.axioms, place), [axiom]))
      );
    case "independence":
      return eachWord(verdict, question.axioms, (word, axiom, place) =>
        word === "independent" ? shown.separates(without(question.axioms, place), [axiom]) : word === "open",
      );
    case "compare":
      return eachWord(verdict, pairsOf(question), (word, [left, right]) =>
        word === "incomparable"
          ? shown.separates(left, right) && shown.separates(right, left)
          : word === "open",
      );
    case "dualise":
      return eachWord(verdict, pairsOf(question), (word, [left, right]) =>
        word === "different" ? shown.separates(left, right) || shown.separates(right, left) : word === "open",
      );
    case "models":
      return verdict === null && facts.every((fact) => contains(fact.holds, question.axioms));
  }
}

/** Whether there is one word for each thing, and each word is supported. */
function eachWord<Thing>(
  verdict: VerdictRecord,
  things: readonly Thing[],
  supports: (word: string, thing: Thing, place: number) => boolean,
): boolean {
  if (!Array.isArray(verdict) || verdict.length !== things.length) return false;
  return things.every((thing, place) => supports(verdict[place], thing, place));
}

function pairsOf(question: QuestionRecord & { ask: "compare" | "dualise" }): [TheoryRecord, TheoryRecord][] {
  return question.theories.flatMap((left, index) =>
    question.theories.slice(index + 1).map((right): [TheoryRecord, TheoryRecord] => [left, right]),
  );
}

function without(axioms: TheoryRecord, place: number): TheoryRecord {
  return axioms.filter((_, other) => other !== place);
}

function contains(larger: TheoryRecord, smaller: TheoryRecord): boolean {
  const members = new Set<SentenceIndex>(larger);
  return smaller.every((index) => members.has(index));
}

/** What checked facts show about theories. */
class Shown {
  readonly #facts: readonly Fact[];

  constructor(facts: readonly Fact[]) {
    this.#facts = facts;
  }

  /** Whether some structure is a model of the first theory and not of the second. */
  separates(first: TheoryRecord, second: TheoryRecord): boolean {
    return this.#facts.some(
      (fact) => fact.fails !== null && contains(fact.holds, first) && contains(second, fact.fails),
    );
  }

  /** Whether some structure is a model of the theory. */
  model(theory: TheoryRecord): boolean {
    return this.#facts.some((fact) => contains(fact.holds, theory));
  }

  /** As {@link model}, on a finite carrier. */
  finiteModel(theory: TheoryRecord): boolean {
    return this.#facts.some(
      (fact) => fact.structure.carrier.kind === "points" && contains(fact.holds, theory),
    );
  }
}
