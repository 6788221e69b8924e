/** Sentences of the corpora that a model is wanted of, and their duals. */
import { type Formula, not } from "../../lib/logic/formula.ts";
import { complementTheory, converseTheory, sentencesOf } from "../../lib/logic/theory.ts";
import { claims, infiniteOnly, questions, readSentences, theoryOf } from "./corpora.ts";

/** As they are, read backwards, with the complementary relations, and both. */
export const FORMS = ["itself", "converse", "complement", "both"] as const;

/** All entries that have infinite models only: sets of axioms, and claims and questions by their countermodels. */
export const infiniteIds: readonly string[] = [
  ...infiniteOnly.map(({ id }) => id),
  ...[...claims, ...questions]
    .filter(({ expected }) => expected === "only infinite countermodels")
    .map(({ id }) => id),
];

/** The sentences that a model is wanted of: axioms, or premises and a negated conclusion. */
export function wantedBy(id: string): readonly Formula[] {
  const set = infiniteOnly.find((entry) => entry.id === id);
  if (set !== undefined) return readSentences(set.axioms);
  const entry = [...claims, ...questions].find((one) => one.id === id)!;
  const [conclusion, ...premises] = readSentences([entry.conclusion, ...entry.premises]);
  return [...premises, not(conclusion!)];
}

export function dualOf(sentences: readonly Formula[], form: (typeof FORMS)[number]): readonly Formula[] {
  const given = theoryOf(sentences);
  const turned = form === "converse" || form === "both" ? converseTheory(given) : given;
  return sentencesOf(form === "complement" || form === "both" ? complementTheory(turned) : turned);
}
