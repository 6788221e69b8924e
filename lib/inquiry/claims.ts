/** The questions that `derive`, `claim` and `conjecture` ask. Each answer is `holds`, `fails` or `open`. */
import type { Structure } from "../carriers/structure.ts";
import type { QuestionRecord } from "../evidence/format.ts";
import { recordStructure } from "../evidence/record.ts";
import { type Formula, not } from "../logic/formula.ts";
import { WorkEnded } from "../logic/meter.ts";
import { conjunctionOf, sentencesOf, type Theory } from "../logic/theory.ts";
import { satisfies } from "../structures/evaluate.ts";
import type { ClaimAnswer, Search, ShownStructure } from "./answer.ts";
import { certify } from "./certify.ts";
import { EvidenceWriter } from "./evidence-writer.ts";
import { jointSignature, searchFinite } from "./finite-search.ts";
import { independenceOf } from "./independence.ts";
import { meterFor, type Work } from "./work.ts";

/** `T ⊨ φ`: fails when a structure is found in which all of T holds and φ does not. */
export function askEntails(premises: Theory, conclusion: Formula, work: Work): ClaimAnswer {
  return askEntailment("entails", premises, conclusion, work);
}

/** `T ⊭ φ`: holds when a structure is found in which all of T holds and φ does not. */
export function askDoesNotEntail(premises: Theory, conclusion: Formula, work: Work): ClaimAnswer {
  return askEntailment("does-not-entail", premises, conclusion, work);
}

function askEntailment(
  ask: "entails" | "does-not-entail",
  premises: Theory,
  conclusion: Formula,
  work: Work,
): ClaimAnswer {
  const writer = new EvidenceWriter();
  const question: QuestionRecord = {
    ask,
    premises: writer.theory(sentencesOf(premises)),
    conclusion: writer.sentence(conclusion),
  };
  const meter = meterFor(work);
  const signature = jointSignature([premises], [conclusion]);
  const alternatives = [[...sentencesOf(premises), not(conclusion)]];
  const found = searchFinite({ sought: "a countermodel", alternatives, signature }, meter, work);
  const structures: ShownStructure[] = [];
  if (found.structure !== null) {
    writer.addStructure(found.structure, sentencesOf(premises), [conclusion]);
    structures.push({ role: "countermodel", structure: found.structure });
  }
  const verdict = ask === "entails" ? "fails" : "holds";
  return concluded(writer, question, verdict, structures, [found.search], meter.steps, work);
}

/** `A ⊨ φ` or `A ⊭ φ` for a structure A: decided by evaluation. */
export function askTruth(
  ask: "true-in" | "false-in",
  structure: Structure,
  sentence: Formula,
  work: Work,
): ClaimAnswer {
  const writer = new EvidenceWriter();
  const question: QuestionRecord = {
    ask,
    structure: recordStructure(structure),
    sentence: writer.sentence(sentence),
  };
  const meter = meterFor(work);
  const search = {
    sought: "the truth value",
    noneUpTo: 0,
    foundAt: null,
    endedAt: null,
    symmetricUpTo: null,
  };
  try {
    work.report("the truth value");
    const verdict = satisfies(structure, sentence, meter) === (ask === "true-in") ? "holds" : "fails";
    const evidence = certify(writer.finish(question, verdict), work);
    return {
      question: "claim",
      verdict,
      steps: meter.steps,
      evidence,
      structures: [{ role: "structure", structure }],
      searches: [{ ...search, ended: null }],
      axioms: null,
    };
  } catch (problem) {
    if (!(problem instanceof WorkEnded)) throw problem;
    const searches = [{ ...search, ended: problem.reason }];
    return {
      question: "claim",
      verdict: "open",
      steps: meter.steps,
      evidence: null,
      structures: [],
      searches,
      axioms: null,
    };
  }
}

/** `T is consistent`: holds when a model is found. */
export function askConsistent(theory: Theory, work: Work): ClaimAnswer {
  return askForModel("consistent", "holds", theory, work);
}

/** `T is infinite-only`: fails when a finite model is found. */
export function askInfiniteOnly(theory: Theory, work: Work): ClaimAnswer {
  return askForModel("infinite-only", "fails", theory, work);
}

/** `T has no finite model`: fails when a finite model is found. */
export function askNoFiniteModel(theory: Theory, work: Work): ClaimAnswer {
  return askForModel("no-finite-model", "fails", theory, work);
}

function askForModel(
  ask: "consistent" | "infinite-only" | "no-finite-model",
  verdict: "holds" | "fails",
  theory: Theory,
  work: Work,
): ClaimAnswer {
  const writer = new EvidenceWriter();
  const sentences = sentencesOf(theory);
  const question: QuestionRecord = { ask, axioms: writer.theory(sentences) };
  const meter = meterFor(work);
  const signature = jointSignature([theory]);
  const found = searchFinite({ sought: "a model", alternatives: [sentences], signature }, meter, work);
  const structures: ShownStructure[] = [];
  if (found.structure !== null) {
    writer.addStructure(found.structure, sentences, null);
    structures.push({ role: "model", structure: found.structure });
  }
  return concluded(writer, question, verdict, structures, [found.search], meter.steps, work);
}

/** `T is independent`: holds when for each axiom a structure is found where it alone fails. */
export function askIndependent(theory: Theory, work: Work): ClaimAnswer {
  const writer = new EvidenceWriter();
  const sentences = sentencesOf(theory);
  const question: QuestionRecord = { ask: "independent", axioms: writer.theory(sentences) };
  const { axioms, steps } = independenceOf(theory, writer, work);
  const all = axioms.every((axiom) => axiom.verdict === "independent");
  return {
    question: "claim",
    verdict: all ? "holds" : "open",
    steps,
    evidence: all ? certify(writer.finish(question, "holds"), work) : null,
    structures: axioms.flatMap(({ label, witness }) =>
      witness === null ? [] : [{ role: `all axioms but ${label} hold`, structure: witness }],
    ),
    searches: axioms.map((axiom) => axiom.search),
    axioms,
  };
}

/** `T is weaker than U`: U says all that T says, and T does not say all that U says. Fails when U has a model that T lacks. */
export function askWeaker(left: Theory, right: Theory, work: Work): ClaimAnswer {
  return askOrder("weaker", left, right, work);
}

/** `T is equivalent to U`: fails when one has a model that the other lacks. */
export function askEquivalent(left: Theory, right: Theory, work: Work): ClaimAnswer {
  return askOrder("equivalent", left, right, work);
}

function askOrder(ask: "weaker" | "equivalent", left: Theory, right: Theory, work: Work): ClaimAnswer {
  const writer = new EvidenceWriter();
  const question: QuestionRecord = {
    ask,
    left: writer.theory(sentencesOf(left)),
    right: writer.theory(sentencesOf(right)),
  };
  const meter = meterFor(work);
  const signature = jointSignature([left, right]);
  const pairs: [Theory, Theory, string][] = [
    [right, left, "model of the second theory that is none of the first"],
  ];
  if (ask === "equivalent")
    pairs.unshift([left, right, "model of the first theory that is none of the second"]);
  const alternatives = pairs.map(([model, other]) => [...sentencesOf(model), not(conjunctionOf(other))]);
  const sought = "a model of one theory that is none of the other";
  const found = searchFinite({ sought, alternatives, signature }, meter, work);
  const structures: ShownStructure[] = [];
  if (found.structure !== null) {
    const [model, other, role] = pairs[found.alternative]!;
    writer.addStructure(found.structure, sentencesOf(model), sentencesOf(other));
    structures.push({ role, structure: found.structure });
  }
  return concluded(writer, question, "fails", structures, [found.search], meter.steps, work);
}

/** The answer of a question that the structures settle, or that stays open without them. */
function concluded(
  writer: EvidenceWriter,
  question: QuestionRecord,
  settled: "holds" | "fails",
  structures: readonly ShownStructure[],
  searches: readonly Search[],
  steps: number,
  work: Work,
): ClaimAnswer {
  const found = structures.length > 0;
  return {
    question: "claim",
    verdict: found ? settled : "open",
    steps,
    evidence: found ? certify(writer.finish(question, settled), work) : null,
    structures,
    searches,
    axioms: null,
  };
}
