/** The questions that `derive`, `claim` and `conjecture` ask. Each answer is `holds`, `fails` or `open`. */
import type { Structure } from "../carriers/structure.ts";
import type { Formula } from "../logic/formula.ts";
import { WorkEnded } from "../logic/meter.ts";
import type { Theory } from "../logic/theory.ts";
import { satisfies } from "../structures/evaluate.ts";
import { mostListed, planSentence } from "../structures/plan.ts";
import type { ClaimAnswer, ClaimVerdict, ShownDerivation, ShownReason, ShownStructure } from "./answer.ts";
import { certify } from "./certify.ts";
import { EvidenceWriter } from "./evidence-writer.ts";
import { jointSignature } from "./finite-search.ts";
import { independenceOf } from "./independence.ts";
import { type Asked, recordQuestion } from "./question-record.ts";
import { type Settled, Settler } from "./settle.ts";
import { meterFor, type Work } from "./work.ts";

/** `T ⊨ φ`: holds when φ is derived from T, fails when a structure is found in which all of T holds and φ does not. */
export function askEntails(premises: Theory, conclusion: Formula, work: Work): ClaimAnswer {
  return askEntailment("entails", premises, conclusion, work);
}

/** `T ⊭ φ`: the other way round. */
export function askDoesNotEntail(premises: Theory, conclusion: Formula, work: Work): ClaimAnswer {
  return askEntailment("does-not-entail", premises, conclusion, work);
}

function askEntailment(
  ask: "entails" | "does-not-entail",
  premises: Theory,
  conclusion: Formula,
  work: Work,
): ClaimAnswer {
  const claim = new ClaimWork({ ask, premises, conclusion }, [premises], [conclusion], work);
  const { settler } = claim;
  const settled = settler.settle(
    {
      premises: premises.axioms,
      // The premises are told apart from it by the label: nothing else is called so.
      conclusions: [{ label: "the conclusion", formula: conclusion, named: false }],
      from: "",
      sought: "a countermodel",
    },
    settler.left,
  );
  claim.add(settled, "countermodel");
  if (settled.outcome === "open") return claim.answer("open");
  if (settled.outcome === "derived" && !settled.inconsistent)
    claim.addContradiction(settler.contradiction(premises.axioms));
  return claim.answer((settled.outcome === "derived") === (ask === "entails") ? "holds" : "fails");
}

/** `A ⊨ φ` or `A ⊭ φ` for a structure A: decided by evaluation. */
export function askTruth(
  ask: "true-in" | "false-in",
  structure: Structure,
  sentence: Formula,
  work: Work,
): ClaimAnswer {
  const writer = new EvidenceWriter();
  const question = recordQuestion({ ask, structure, sentence }, writer);
  const meter = meterFor(work);
  const search = {
    sought: "the truth value",
    noneUpTo: 0,
    foundAt: null,
    endedAt: null,
    symmetricUpTo: null,
    noneOnCarriers: 0,
    configurations: null,
  };
  const rest = { derivations: [], reports: [], inconsistent: false, noFinite: null, axioms: null } as const;
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
      ...rest,
    };
  } catch (problem) {
    if (!(problem instanceof WorkEnded)) throw problem;
    return {
      question: "claim",
      verdict: "open",
      steps: meter.steps,
      evidence: null,
      structures: [],
      searches: [{ ...search, ended: problem.reason, configurations: listedIn(structure, sentence) }],
      ...rest,
    };
  }
}

/** How many configurations a walk through a sentence may list; null on a finite structure. */
function listedIn({ carrier }: Structure, sentence: Formula): number | null {
  return carrier.size === null ? mostListed(planSentence(sentence), carrier) : null;
}

/** `T is consistent`: holds when a model is found, fails when a contradiction is derived. */
export function askConsistent(theory: Theory, work: Work): ClaimAnswer {
  const claim = new ClaimWork({ ask: "consistent", theory }, [theory], [], work);
  const { outcome } = claim.settleModel(theory, false);
  return claim.answer(outcome === "open" ? "open" : outcome === "refuted" ? "holds" : "fails");
}

/**
 * `T is infinite-only`: holds when an infinite model is found and a reason why there is no finite one derived; fails when a
 * finite model is found, or when there is no model at all.
 */
export function askInfiniteOnly(theory: Theory, work: Work): ClaimAnswer {
  const claim = new ClaimWork({ ask: "infinite-only", theory }, [theory], [], work);
  const { outcome, infinite, noFinite } = claim.settleModel(theory, true);
  if (outcome !== "open") return claim.answer("fails");
  return claim.answer(infinite !== null && noFinite !== null ? "holds" : "open");
}

/**
 * `T has no finite model`: holds when a reason for that or a contradiction is derived, fails when a finite model is found.
 */
export function askNoFiniteModel(theory: Theory, work: Work): ClaimAnswer {
  const claim = new ClaimWork({ ask: "no-finite-model", theory }, [theory], [], work);
  const { outcome, noFinite } = claim.settleModel(theory, true);
  if (outcome === "refuted") return claim.answer("fails");
  return claim.answer(outcome === "derived" || noFinite !== null ? "holds" : "open");
}

/**
 * `T is independent`: holds when for each axiom a structure is found where it alone fails, fails when one is derived
 * from the others.
 */
export function askIndependent(theory: Theory, work: Work): ClaimAnswer {
  const asked: Asked = { ask: "independent", theory };
  const claim = new ClaimWork(asked, [theory], [], work);
  const axioms = independenceOf(theory, claim.settler);
  for (const { label, witness, derivation, search, report } of axioms) {
    if (witness !== null) claim.structures.push({ role: `all axioms but ${label} hold`, structure: witness });
    if (derivation !== null) claim.derivations.push(derivation);
    claim.searches.push(search);
    claim.reports.push(report);
  }
  const verdicts = axioms.map((axiom) => axiom.verdict);
  const verdict = verdicts.includes("redundant") ? "fails" : verdicts.includes("open") ? "open" : "holds";
  return { ...claim.answer(verdict), axioms };
}

/**
 * `T is weaker than U`: U says all that T says, and T does not say all that U says. Holds by derivations of T from U
 * and a model of T that is none of U; fails by a model of U that is none of T, or by derivations of U from T.
 */
export function askWeaker(left: Theory, right: Theory, work: Work): ClaimAnswer {
  const claim = new ClaimWork({ ask: "weaker", left, right }, [left, right], [], work);
  const below = claim.direction(right, left, ["the second theory", "the first"], 2);
  if (below.outcome === "refuted") return claim.answer("fails");
  const above = claim.direction(left, right, ["the first theory", "the second"], 1);
  if (above.outcome === "derived") return claim.answer("fails");
  return claim.answer(below.outcome === "derived" && above.outcome === "refuted" ? "holds" : "open");
}

/** `T is equivalent to U`: holds by derivations both ways, fails when one has a model that the other lacks. */
export function askEquivalent(left: Theory, right: Theory, work: Work): ClaimAnswer {
  const claim = new ClaimWork({ ask: "equivalent", left, right }, [left, right], [], work);
  const forth = claim.direction(left, right, ["the first theory", "the second"], 2);
  if (forth.outcome === "refuted") return claim.answer("fails");
  const back = claim.direction(right, left, ["the second theory", "the first"], 1);
  if (back.outcome === "refuted") return claim.answer("fails");
  return claim.answer(forth.outcome === "derived" && back.outcome === "derived" ? "holds" : "open");
}

/** A claim while it is worked on. */
class ClaimWork {
  readonly settler: Settler;
  readonly structures: ShownStructure[] = [];
  readonly derivations: ShownDerivation[] = [];
  readonly searches: ClaimAnswer["searches"][number][] = [];
  readonly reports: ClaimAnswer["reports"][number][] = [];
  #inconsistent = false;
  #noFinite: ShownReason | null = null;
  readonly #writer = new EvidenceWriter();
  readonly #question;
  readonly #work: Work;

  constructor(asked: Asked, theories: readonly Theory[], sentences: readonly Formula[], work: Work) {
    this.#question = recordQuestion(asked, this.#writer);
    this.#work = work;
    this.settler = new Settler(jointSignature(theories, sentences), this.#writer, work);
  }

  /** Looks for a model, for a contradiction, and where only finite models count, for a reason why there is none. */
  settleModel({ axioms }: Theory, finite: boolean): Settled {
    const entailment = { premises: axioms, conclusions: [], from: "", sought: "a model", finite };
    const settled = this.settler.settle(entailment, this.settler.left);
    this.add(settled, "model");
    return settled;
  }

  /** @param role what a structure found is, for people */
  add(settled: Settled, role: string): void {
    const { structure, infinite } = settled;
    if (structure !== null) this.structures.push({ role, structure });
    if (infinite !== null) this.structures.push({ role: `infinite ${role}`, structure: infinite });
    this.#noFinite ??= settled.noFinite;
    this.derivations.push(...settled.derivations);
    this.searches.push(settled.search);
    this.reports.push(settled.report);
    if (settled.inconsistent) this.#inconsistent = true;
  }

  /** Adds a derivation of a contradiction, which is to be shown first. */
  addContradiction(derivation: ShownDerivation | null): void {
    if (derivation === null) return;
    this.derivations.unshift(derivation);
    this.#inconsistent = true;
  }

  /** Whether one theory entails all of the other, with the steps of one of so many searches to come. */
  direction(from: Theory, to: Theory, names: readonly [string, string], searches: number): Settled {
    const entailment = {
      premises: from.axioms,
      conclusions: to.axioms,
      from: `from ${names[0]}`,
      sought: `a model of ${names[0]} that is none of ${names[1]}`,
    };
    const settled =
      to.axioms.length === 0
        ? this.#nothingToShow(entailment.sought)
        : this.settler.settle(entailment, Math.max(1, Math.floor(this.settler.left / searches)));
    this.add(settled, entailment.sought.slice(2));
    return settled;
  }

  answer(verdict: ClaimVerdict): ClaimAnswer {
    return {
      question: "claim",
      verdict,
      steps: this.settler.steps,
      evidence: verdict === "open" ? null : certify(this.#writer.finish(this.#question, verdict), this.#work),
      structures: this.structures,
      searches: this.searches,
      derivations: this.derivations,
      reports: this.reports,
      inconsistent: this.#inconsistent,
      noFinite: this.#noFinite,
      axioms: null,
    };
  }

  /** A theory without axioms follows from every theory. */
  #nothingToShow(sought: string): Settled {
    const search = {
      sought,
      noneUpTo: 0,
      foundAt: null,
      ended: null,
      endedAt: null,
      symmetricUpTo: null,
      noneOnCarriers: 0,
      configurations: null,
    };
    const report = { sought: "the axioms", result: "derived", ended: null, generated: 0 } as const;
    return {
      outcome: "derived",
      structure: null,
      infinite: null,
      noFinite: null,
      derivations: [],
      inconsistent: false,
      search,
      report,
    };
  }
}
