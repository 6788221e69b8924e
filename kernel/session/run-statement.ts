/** From a statement to the answer of the question that it asks. */
import { buildStructure } from "../../lib/carriers/defined.ts";
import type { Answer, ClaimAnswer } from "../../lib/inquiry/answer.ts";
import { checkFinite } from "../../lib/inquiry/check-finite.ts";
import {
  askConsistent,
  askDoesNotEntail,
  askEntails,
  askEquivalent,
  askIndependent,
  askInfiniteOnly,
  askNoFiniteModel,
  askTruth,
  askWeaker,
} from "../../lib/inquiry/claims.ts";
import { compareTheories } from "../../lib/inquiry/compare.ts";
import { countModels } from "../../lib/inquiry/count.ts";
import { askDuals, dualsOf } from "../../lib/inquiry/dualise.ts";
import { askIndependence } from "../../lib/inquiry/independence.ts";
import { minimise } from "../../lib/inquiry/minimise.ts";
import { findModels } from "../../lib/inquiry/models.ts";
import type { Asked } from "../../lib/inquiry/question-record.ts";
import { DEFAULT_LARGEST_SIZE, DEFAULT_LARGEST_SYMMETRIC_SIZE, type Work } from "../../lib/inquiry/work.ts";
import type { Claim, Options, Statement } from "../../lib/language/statements.ts";
import { DEFAULT_BUDGET } from "../../lib/logic/meter.ts";

/** A statement that asks something; the others define, declare or describe. */
export type Question = Extract<Statement, { options: Options }>;

export function isQuestion(statement: Statement): statement is Question {
  return "options" in statement;
}

/** Whom a running question tells how far it is, and who may stop it. */
export type Watch = Pick<Work, "isInterrupted" | "report">;

/** Works on a question within its options. */
export function answerQuestion(question: Question, watch: Watch): Answer {
  const work: Work = {
    ...watch,
    budget: question.options.within ?? DEFAULT_BUDGET,
    upTo: question.options.upTo ?? DEFAULT_LARGEST_SIZE,
    symmetricUpTo: question.options.upTo ?? DEFAULT_LARGEST_SYMMETRIC_SIZE,
  };
  switch (question.kind) {
    case "derive":
      return askEntails(question.premises.theory, question.conclusion.formula, work);
    case "claim":
    case "conjecture":
      return answerClaim(question.claim, work);
    case "check-finite":
      return checkFinite(question.theory.theory, work);
    case "dualise":
      return askDuals(question.theory.text, question.theory.theory, work);
    case "compare":
      return compareTheories(
        question.theories.map(({ text, theory }) => ({ name: text, theory })),
        work,
      );
    case "independence":
      return askIndependence(question.theory.theory, work);
    case "minimise":
      return minimise(question.theory.theory, work);
    case "models":
      return findModels(question.theory.theory, question.size, work);
    case "count":
      return countModels(question.theory.theory, question.representatives, work);
  }
}

function answerClaim(claim: Claim, work: Work): ClaimAnswer {
  switch (claim.kind) {
    case "entails":
      return askEntails(claim.premises.theory, claim.conclusion.formula, work);
    case "does-not-entail":
      return askDoesNotEntail(claim.premises.theory, claim.conclusion.formula, work);
    case "true-in":
    case "false-in":
      return askTruth(claim.kind, buildStructure(claim.structure.structure), claim.sentence.formula, work);
    case "consistent":
      return askConsistent(claim.theory.theory, work);
    case "infinite-only":
      return askInfiniteOnly(claim.theory.theory, work);
    case "no-finite-model":
      return askNoFiniteModel(claim.theory.theory, work);
    case "independent":
      return askIndependent(claim.theory.theory, work);
    case "weaker":
      return askWeaker(claim.left.theory, claim.right.theory, work);
    case "equivalent":
      return askEquivalent(claim.left.theory, claim.right.theory, work);
  }
}

/**
 * What evidence for a question is about. `models` and `count` leave sizes to the statement's text.
 */
export function askedOf(question: Question): Asked {
  switch (question.kind) {
    case "derive":
      return { ask: "entails", premises: question.premises.theory, conclusion: question.conclusion.formula };
    case "claim":
    case "conjecture":
      return askedInClaim(question.claim);
    case "dualise":
      return {
        ask: "dualise",
        theories: dualsOf(question.theory.text, question.theory.theory).map(({ theory }) => theory),
      };
    case "compare":
      return { ask: "compare", theories: question.theories.map(({ theory }) => theory) };
    case "count":
      return { ask: "models", theory: question.theory.theory };
    default:
      return { ask: question.kind, theory: question.theory.theory };
  }
}

function askedInClaim(claim: Claim): Asked {
  switch (claim.kind) {
    case "entails":
    case "does-not-entail":
      return { ask: claim.kind, premises: claim.premises.theory, conclusion: claim.conclusion.formula };
    case "true-in":
    case "false-in":
      return {
        ask: claim.kind,
        structure: buildStructure(claim.structure.structure),
        sentence: claim.sentence.formula,
      };
    case "weaker":
    case "equivalent":
      return { ask: claim.kind, left: claim.left.theory, right: claim.right.theory };
    default:
      return { ask: claim.kind, theory: claim.theory.theory };
  }
}

/** Whether the user stopped the work on a question before it was done. */
export function wasInterrupted(answer: Answer): boolean {
  switch (answer.question) {
    case "claim":
      return [...answer.searches, ...answer.reports].some(({ ended }) => ended === "interrupted");
    case "check-finite":
      return [answer.search, answer.report].some(({ ended }) => ended === "interrupted");
    case "models":
    case "count":
    case "minimise":
      return answer.ended === "interrupted";
    case "independence":
      return answer.axioms.some(({ search, report }) =>
        [search, report].some(({ ended }) => ended === "interrupted"),
      );
    case "compare":
    case "dualise":
      return answer.interrupted;
  }
}
