/** Questions as evidence records them: what was asked, with all definitions expanded. */
import type { Structure } from "../carriers/structure.ts";
import { recordStructure } from "../carriers/structure-record.ts";
import { digestOf } from "../evidence/digest.ts";
import type { QuestionRecord, TheoryQuestion } from "../evidence/format.ts";
import type { Formula } from "../logic/formula.ts";
import { sentencesOf, type Theory } from "../logic/theory.ts";
import { EvidenceWriter } from "./evidence-writer.ts";

/** A question before it is worked on. */
export type Asked =
  | { readonly ask: "entails" | "does-not-entail"; readonly premises: Theory; readonly conclusion: Formula }
  | { readonly ask: "true-in" | "false-in"; readonly structure: Structure; readonly sentence: Formula }
  | { readonly ask: TheoryQuestion; readonly theory: Theory }
  | { readonly ask: "weaker" | "equivalent"; readonly left: Theory; readonly right: Theory }
  | { readonly ask: "compare" | "dualise"; readonly theories: readonly Theory[] };

/** The record of a question; its sentences become the first of the evidence. */
export function recordQuestion(asked: Asked, writer: EvidenceWriter): QuestionRecord {
  const record = (theory: Theory) => writer.theory(sentencesOf(theory));
  switch (asked.ask) {
    case "entails":
    case "does-not-entail":
      return {
        ask: asked.ask,
        premises: record(asked.premises),
        conclusion: writer.sentence(asked.conclusion),
      };
    case "true-in":
    case "false-in":
      return {
        ask: asked.ask,
        structure: recordStructure(asked.structure),
        sentence: writer.sentence(asked.sentence),
      };
    case "weaker":
    case "equivalent":
      return { ask: asked.ask, left: record(asked.left), right: record(asked.right) };
    case "compare":
    case "dualise":
      return { ask: asked.ask, theories: asked.theories.map(record) };
    default:
      return { ask: asked.ask, axioms: record(asked.theory) };
  }
}

/** The digest that evidence for the question carries. */
export function digestOfAsked(asked: Asked): string {
  const writer = new EvidenceWriter();
  const question = recordQuestion(asked, writer);
  return digestOf(writer.sentences, question);
}
