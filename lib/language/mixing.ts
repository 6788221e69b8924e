/**
 * One name, one relation: a statement that would be about relations of the same name with different numbers of
 * places is refused. It comes about when a relation is declared anew while definitions with the older one are in use.
 */
import { type Formula, relationsOf } from "../logic/formula.ts";
import { sentencesOf } from "../logic/theory.ts";
import type { StatementBody } from "./statement-readers.ts";
import type { Claim, Definition, DescribeSubject, WrittenSubject } from "./statements.ts";

/** A relation that occurs in a statement with two numbers of places; null when there is none. */
export function findMixedRelation(
  statement: StatementBody,
): { readonly name: string; readonly places: readonly [number, number] } | null {
  const seen = new Map<string, number>();
  for (const { name, places } of formulasIn(statement).flatMap(relationsOf)) {
    const before = seen.get(name);
    if (before !== undefined && before !== places) return { name, places: [before, places] };
    seen.set(name, places);
  }
  return null;
}

function formulasIn(statement: StatementBody): readonly Formula[] {
  switch (statement.kind) {
    case "relation":
      return [];
    case "define":
      return formulasOfDefinition(statement.definition);
    case "describe":
      return formulasOfSubject(statement.subject);
    case "derive":
      return [...sentencesOf(statement.premises.theory), statement.conclusion.formula];
    case "claim":
    case "conjecture":
      return formulasOfClaim(statement.claim);
    case "compare":
      return statement.theories.flatMap(({ theory }) => sentencesOf(theory));
    case "check-finite":
    case "dualise":
    case "independence":
    case "minimise":
    case "models":
    case "count":
      return sentencesOf(statement.theory.theory);
    case "normalise":
      return [statement.subject.formula];
    case "write":
      return formulasWritten(statement.subject);
  }
}

function formulasWritten(subject: WrittenSubject): readonly Formula[] {
  if (subject.kind === "structure") return subject.sentences.map(({ formula }) => formula);
  const { theory, conclusion } = subject;
  return [...sentencesOf(theory.theory), ...(conclusion === null ? [] : [conclusion.formula])];
}

function formulasOfDefinition(definition: Definition): readonly Formula[] {
  switch (definition.kind) {
    case "formula":
      return [definition.body];
    case "theory":
      return sentencesOf(definition.theory);
    case "structure":
      return [];
  }
}

function formulasOfSubject(subject: DescribeSubject): readonly Formula[] {
  switch (subject.kind) {
    case "theory":
      return sentencesOf(subject.theory.theory);
    case "formula":
      return [subject.definition.body];
    case "sentence":
      return [subject.sentence.formula];
    case "structure":
    case "relation":
      return [];
  }
}

function formulasOfClaim(claim: Claim): readonly Formula[] {
  switch (claim.kind) {
    case "entails":
    case "does-not-entail":
      return [...sentencesOf(claim.premises.theory), claim.conclusion.formula];
    case "true-in":
    case "false-in":
      return [claim.sentence.formula];
    case "weaker":
    case "equivalent":
      return [...sentencesOf(claim.left.theory), ...sentencesOf(claim.right.theory)];
    default:
      return sentencesOf(claim.theory.theory);
  }
}
