/**
 * Settling whether sentences follow from others: the search for derivations and the search for structures, in turns
 * from a fixed list. The first to answer decides.
 */
import { type AnyStructure, isOfTerms, sizeOf } from "../carriers/any-structure.ts";
import type { Structure } from "../carriers/structure.ts";
import type { Derivation, DerivationTask } from "../derivation/derive.ts";
import { DerivationSearch } from "../derivation/turns.ts";
import { type Formula, not } from "../logic/formula.ts";
import { type EndReason, Meter, WorkEnded } from "../logic/meter.ts";
import { recordFormula } from "../logic/records/formulas.ts";
import { MeterShare } from "../logic/share.ts";
import type { Axiom, Signature } from "../logic/theory.ts";
import { satisfiesAll } from "../structures/evaluate.ts";
import { findFreeTerms } from "../structures/free-terms/find.ts";
import { Solver } from "../structures/sat/solver.ts";
import type { DerivationReport, Search, ShownDerivation, ShownReason } from "./answer.ts";
import type { EvidenceWriter } from "./evidence-writer.ts";
import { FiniteSearch, shareOfComplete } from "./finite-search.ts";
import { FinitenessSearch, type NoFiniteModel } from "./finiteness/search.ts";
import { InfiniteSearch, ROUNDS } from "./infinite-search.ts";
import type { Work } from "./work.ts";

/** Whether all conclusions follow from the premises; without conclusions, whether the premises contradict each other. */
export interface Entailment {
  /**
   * Whether the question is about finite models, and there are no conclusions. Then only a finite structure refutes; an
   * infinite one is looked for besides, and a reason why there is no finite one.
   */
  readonly finite?: boolean;
  /** Whether a structure is to decide other sentences too: then none of free terms is looked for. */
  readonly decides?: boolean;
  readonly premises: readonly Axiom[];
  readonly conclusions: readonly Axiom[];
  /** From what the conclusions are derived, for people, after their labels: "from Order"; empty where that is clear. */
  readonly from: string;
  /** What a structure against it would be, for people: "a countermodel". */
  readonly sought: string;
}

export interface Settled {
  readonly outcome: "derived" | "refuted" | "open";
  /** A model of the premises where some conclusion fails; null unless refuted. */
  readonly structure: AnyStructure | null;
  /** An infinite model, where the question is about finite ones; null when none was found. */
  readonly infinite: AnyStructure | null;
  /** Why there is no finite model, where the question is about finite ones; null when that was not derived. */
  readonly noFinite: ShownReason | null;
  /** One for each conclusion that is not itself a premise, or one of a contradiction; none unless derived. */
  readonly derivations: readonly ShownDerivation[];
  /** Whether the premises are derived to contradict each other. */
  readonly inconsistent: boolean;
  readonly search: Search;
  readonly report: DerivationReport;
}

type Stage =
  /** Derivations until so many clauses have been generated for each conclusion, within a part of the budget. */
  | { readonly kind: "derive"; readonly generated: number; readonly share: number }
  /** Structures on up to so many points, within a part of the budget. */
  | { readonly kind: "structures"; readonly upTo: number; readonly share: number }
  /** Infinite structures to the end of a round, within a part of the budget. */
  | { readonly kind: "infinite"; readonly round: number; readonly share: number }
  /** Structures of free terms, within a part of the budget. */
  | { readonly kind: "terms"; readonly share: number }
  /** Where the question is about finite models: reasons why there is none, to the end of a level. */
  | { readonly kind: "reason"; readonly level: number; readonly share: number };

/**
 * Most that is settled at all is settled by a short derivation or a very small structure; each stage costs at most a few
 * times as much as those before it. What is left of the budget after them is shared by both searches.
 */
const STAGES: readonly Stage[] = [
  { kind: "derive", generated: 150, share: 1 / 8 },
  { kind: "structures", upTo: 3, share: 1 / 20 },
  { kind: "infinite", round: 0, share: 1 / 50 },
  { kind: "reason", level: 0, share: 1 / 50 },
  { kind: "derive", generated: 1_500, share: 1 / 8 },
  { kind: "structures", upTo: 5, share: 1 / 10 },
  { kind: "infinite", round: 1, share: 1 / 50 },
  { kind: "reason", level: 1, share: 1 / 50 },
  { kind: "derive", generated: 8_000, share: 1 / 8 },
  { kind: "terms", share: 1 / 40 },
  { kind: "infinite", round: 2, share: 1 / 10 },
  { kind: "reason", level: 2, share: 1 / 10 },
  { kind: "structures", upTo: 7, share: 1 / 8 },
  { kind: "derive", generated: 40_000, share: 1 / 4 },
  { kind: "infinite", round: 3, share: 1 / 8 },
  { kind: "reason", level: 3, share: 1 / 8 },
];

/** Finite structures on up to so many points are preferred to an infinite one … */
const PREFERRED_POINTS = 7;
/** … where they are found within this part of the budget. */
const PREFERRED_SHARE = 1 / 100;

/** Each structure that was found before is tried within this part of the budget. */
const KNOWN_SHARE = 1 / 200;

/** Premises without a model on so many points are looked at for a contradiction, after something was derived from them … */
const CONTRADICTION_POINTS = 3;
/** … within so many generated clauses, … */
const CONTRADICTION_CLAUSES = 1_000;
/** … and within this part of the budget, structures included. */
const CONTRADICTION_SHARE = 1 / 20;

/** Settles entailments over one signature, adds what they rest on to the evidence, and keeps the structures it finds. */
export class Settler {
  readonly #signature: Signature;
  readonly #writer: EvidenceWriter;
  readonly #work: Work;
  readonly #known: Structure[] = [];
  /** Steps spent so far. */
  steps = 0;
  /** Whether the user has interrupted; nothing more is searched then. */
  interrupted = false;

  constructor(signature: Signature, writer: EvidenceWriter, work: Work) {
    this.#signature = signature;
    this.#writer = writer;
    this.#work = work;
  }

  /** Steps that are left of the whole question's. */
  get left(): number {
    return Math.max(1, this.#work.budget - this.steps);
  }

  /** @param budget steps for this entailment */
  settle(entailment: Entailment, budget: number): Settled {
    const meter = new Meter(budget, this.#work.isInterrupted);
    const run = new Run(entailment, this.#signature, this.#known, meter, this.#work);
    if (!this.interrupted) run.go();
    this.steps += meter.steps;
    if (meter.ended === "interrupted") this.interrupted = true;
    return this.#record(entailment, run);
  }

  /**
   * A derivation that the premises contradict each other, where a short search finds one and no small model. Meant for
   * premises from which something has been derived: everything follows from a contradiction.
   */
  contradiction(premises: readonly Axiom[]): ShownDerivation | null {
    if (this.interrupted || premises.length === 0) return null;
    const budget = Math.min(this.left, Math.max(1, Math.floor(this.#work.budget * CONTRADICTION_SHARE)));
    const meter = new Meter(budget, this.#work.isInterrupted);
    const entailment = { premises, conclusions: [], from: "", sought: "a model of the premises" };
    const run = new Run(entailment, this.#signature, this.#known, meter, this.#work);
    run.lookForContradiction();
    this.steps += meter.steps;
    if (meter.ended === "interrupted") this.interrupted = true;
    return run.derived === null ? null : (this.#record(entailment, run).derivations[0] ?? null);
  }

  #record(entailment: Entailment, run: Run): Settled {
    const { premises, conclusions } = entailment;
    const { structure, infinite } = run;
    for (const found of [structure, infinite]) {
      if (found === null) continue;
      // Free terms do not decide other sentences.
      if (!isOfTerms(found) && !this.#known.includes(found)) this.#known.push(found);
      const fails = conclusions.length === 0 ? null : formulasOf(conclusions);
      this.#writer.addStructure(found, formulasOf(premises), fails);
    }
    const derivations = (run.derived ?? []).map(({ task, derivation, label }) =>
      this.#show(task, derivation, premises, label),
    );
    return {
      outcome: run.derived !== null ? "derived" : structure !== null ? "refuted" : "open",
      structure,
      infinite,
      // From premises that contradict each other everything follows: that is all there is to show.
      noFinite:
        run.noFinite === null || run.derived !== null ? null : this.#showReason(run.noFinite, premises),
      derivations,
      inconsistent: derivations.some(({ conclusion }) => conclusion === null),
      search: run.search,
      report: run.report,
    };
  }

  #show(
    task: DerivationTask,
    derivation: Derivation,
    premises: readonly Axiom[],
    label: string,
  ): ShownDerivation {
    const fact = this.#writer.addDerivation(task, derivation);
    const used = derivation.premises.map((place) => premises[place]!);
    const conclusion = derivation.usesConclusion ? task.conclusion : null;
    const role = conclusion === null ? "the premises contradict each other" : label;
    return { role, premises: used, conclusion, fact };
  }

  #showReason({ reason, obligations }: NoFiniteModel, premises: readonly Axiom[]): ShownReason {
    this.#writer.addNoFiniteModel(formulasOf(premises), reason.record);
    return {
      reason,
      obligations: obligations.map(({ formula, role, derived }) => ({
        formula,
        role,
        derivation: derived === null ? null : this.#show(derived.task, derived.derivation, premises, role),
      })),
    };
  }
}

interface Derived {
  readonly task: DerivationTask;
  readonly derivation: Derivation;
  /** What is derived, for people. */
  readonly label: string;
}

/** A conclusion that is to be derived, or a contradiction. */
interface Goal {
  readonly task: DerivationTask;
  readonly label: string;
  readonly search: DerivationSearch;
  derivation: Derivation | null;
}

/** One entailment while it is worked on. */
class Run {
  /** What was derived for all goals; null while some goal is open. */
  derived: readonly Derived[] | null = null;
  structure: AnyStructure | null = null;
  /** An infinite model, where only a finite one is an answer. */
  infinite: AnyStructure | null = null;
  noFinite: NoFiniteModel | null = null;
  /** Whether some goal is shown to have no derivation. */
  #saturated = false;
  #ended: EndReason | null = null;
  readonly #goals: readonly Goal[];
  readonly #finite: FiniteSearch;
  readonly #infinite: InfiniteSearch;
  /** Null when the question is not about finite models. */
  readonly #reasons: FinitenessSearch | null;
  readonly #wanted: readonly Formula[];
  readonly #structures: readonly Structure[];
  readonly #meter: Meter;
  readonly #work: Work;
  readonly #sought: string;
  /** What a structure would be, for people. */
  readonly #what: string;
  readonly #decides: boolean;
  readonly #signature: Signature;
  readonly #budget: number;

  constructor(
    { premises, conclusions, from, sought, finite = false, decides = false }: Entailment,
    signature: Signature,
    structures: readonly Structure[],
    meter: Meter,
    work: Work,
  ) {
    this.#structures = structures;
    this.#meter = meter;
    this.#work = work;
    this.#what = sought;
    this.#decides = decides;
    this.#signature = signature;
    this.#budget = meter.left / 1000;
    const formulas = formulasOf(premises);
    // As evidence sees it: the very same sentence, names of variables included.
    const known = new Set(formulas.map(textOf));
    const open = conclusions.filter(({ formula }) => !known.has(textOf(formula)));
    const goals =
      conclusions.length === 0
        ? [{ conclusion: null, label: "a contradiction" }]
        : open.map(({ label, formula }) => ({ conclusion: formula, label: `${label} ${from}`.trimEnd() }));
    this.#goals = goals.map(({ conclusion, label }) => {
      const task = { premises: formulas, conclusion };
      return {
        task,
        label,
        search: new DerivationSearch(task, (onDerived) => new Solver({ observer: { onDerived } })),
        derivation: null,
      };
    });
    this.#sought =
      conclusions.length === 0
        ? "a contradiction"
        : conclusions.length === 1
          ? "the conclusion"
          : "the axioms";
    this.#wanted = conclusions.length === 0 ? formulas : [...formulas, not(all(formulasOf(conclusions)))];
    this.#finite = new FiniteSearch({ sought, alternatives: [this.#wanted], signature }, meter, work);
    this.#infinite = new InfiniteSearch({ sought, sentences: this.#wanted, signature }, meter, work);
    this.#reasons = finite ? new FinitenessSearch(formulas, signature) : null;
    if (this.#goals.length === 0) this.derived = [];
  }

  get search(): Search {
    return { ...this.#finite.search, noneOnCarriers: this.#infinite.noneOn };
  }

  get report(): DerivationReport {
    const generated = this.#goals.reduce((sum, { search }) => sum + search.generated, 0);
    const result =
      this.derived !== null
        ? "derived"
        : this.#saturated
          ? "saturated"
          : (this.structure ?? this.infinite) !== null
            ? "stopped"
            : "ended";
    return {
      sought: this.#sought,
      result,
      ended: result === "ended" ? (this.#ended ?? this.#meter.ended ?? "budget") : null,
      generated,
    };
  }

  go(): void {
    this.#guard(() => {
      this.#settle();
      this.#preferFinite();
    });
  }

  /** An infinite structure settles an entailment; a small finite one says the same more simply, where a short search meets it. */
  #preferFinite(): void {
    const infinite = this.structure;
    if (infinite === null || sizeOf(infinite) !== null || this.#reasons !== null) return;
    this.structure = null;
    this.#searchStructures(PREFERRED_POINTS, this.#budget * PREFERRED_SHARE);
    this.structure ??= infinite;
  }

  #settle(): void {
    this.#tryKnown();
    for (const stage of STAGES) {
      if (this.#isSettled) return;
      this.#do(stage);
    }
    if (this.#isSettled) return;
    // What is left is shared by the searches that may still answer; what one leaves goes to the next.
    const left = () => this.#meter.left / 1000;
    if (this.#mayDerive) this.#searchAllStructures(left() / 2);
    this.#searchInfinite(ROUNDS.length, left() / 4);
    this.#reason(Number.POSITIVE_INFINITY, left() / 4);
    const kept = this.#finite.isExhausted ? 1 : 3 / 4;
    this.#derive(Number.POSITIVE_INFINITY, left() * kept);
    this.#searchAllStructures(left());
  }

  #do(stage: Stage): void {
    const steps = this.#budget * stage.share;
    switch (stage.kind) {
      case "derive":
        this.#derive(stage.generated, steps);
        return;
      case "structures":
        this.#searchStructures(stage.upTo, steps);
        return;
      case "infinite":
        this.#searchInfinite(stage.round, steps);
        return;
      case "terms":
        this.#searchTerms(steps);
        return;
      case "reason":
        this.#reason(stage.level, steps);
    }
  }

  /** A short look for a small model or a contradiction. */
  lookForContradiction(): void {
    this.#guard(() => {
      this.#tryKnown();
      this.#searchStructures(CONTRADICTION_POINTS, this.#budget / 2);
      this.#derive(CONTRADICTION_CLAUSES, this.#budget);
    });
  }

  get #isSettled(): boolean {
    if (this.derived !== null || this.structure !== null || this.#meter.ended === "interrupted") return true;
    return this.infinite !== null && this.noFinite !== null;
  }

  /** An infinite model in which every sentence can be evaluated. */
  get #model(): Structure | null {
    return this.infinite === null || isOfTerms(this.infinite) ? null : this.infinite;
  }

  /** Whether there may be a derivation. */
  get #mayDerive(): boolean {
    return !this.#saturated && this.infinite === null;
  }

  #guard(work: () => void): void {
    try {
      work();
    } catch (problem) {
      if (!(problem instanceof WorkEnded)) throw problem;
      this.#ended = problem.reason;
    }
  }

  /** Structures found before may do again. Deep sentences on infinite ones are given up early. */
  #tryKnown(): void {
    if (this.derived !== null) return;
    for (const known of this.#structures) {
      const share = new MeterShare(this.#meter, Math.max(1, this.#budget * KNOWN_SHARE));
      try {
        if (satisfiesAll(known, this.#wanted, share.meter)) this.#keep(known);
      } catch (problem) {
        if (!(problem instanceof WorkEnded) || share.ended === "interrupted") throw problem;
      } finally {
        share.settle();
      }
      if (this.#isSettled) return;
    }
  }

  #searchStructures(upTo: number, steps: number): void {
    if (this.#isSettled || this.noFinite !== null) return;
    this.#finite.advance(upTo, Math.max(1, steps));
    if (this.#finite.found !== null) this.#keep(this.#finite.found.structure);
  }

  /** All sizes asked for, and those beyond. */
  #searchAllStructures(steps: number): void {
    const complete = steps * shareOfComplete(this.#work);
    this.#searchStructures(this.#work.upTo, complete);
    if (this.#isSettled || this.noFinite !== null) return;
    this.#finite.goBeyond(steps - complete);
    if (this.#finite.found !== null) this.#keep(this.#finite.found.structure);
  }

  #searchInfinite(round: number, steps: number): void {
    if (this.#isSettled || this.infinite !== null) return;
    this.#infinite.advance(round, steps);
    if (this.#infinite.found !== null) this.#keep(this.#infinite.found);
  }

  #searchTerms(steps: number): void {
    if (this.#decides || this.#isSettled || this.infinite !== null) return;
    this.#work.report(`${this.#what} of free terms`);
    const share = new MeterShare(this.#meter, Math.max(1, steps));
    try {
      const found = findFreeTerms(this.#wanted, this.#signature.relations, share.meter);
      if (found !== null) this.#keep({ terms: found.record, certificates: found.certificates });
    } catch (problem) {
      if (!(problem instanceof WorkEnded) || share.ended === "interrupted") throw problem;
    } finally {
      share.settle();
    }
  }

  #keep(structure: AnyStructure): void {
    if (sizeOf(structure) === null && this.#reasons !== null) this.infinite ??= structure;
    else this.structure ??= structure;
  }

  /** Reasons why there is no finite model, to the end of a level. */
  #reason(level: number, steps: number): void {
    if (this.#reasons === null || this.#isSettled || this.noFinite !== null) return;
    const share = new MeterShare(this.#meter, Math.max(1, steps));
    try {
      this.#work.report(`a reason why there is no finite model: ${this.#reasons.tried} tried`);
      this.noFinite = this.#reasons.advance(level, share.meter, this.#model);
      const contradiction = this.noFinite?.obligations.find(
        ({ derived }) => derived?.derivation.usesConclusion === false,
      );
      if (contradiction?.derived != null)
        this.derived = [{ ...contradiction.derived, label: "a contradiction" }];
    } catch (problem) {
      if (!(problem instanceof WorkEnded) || share.ended === "interrupted") throw problem;
    } finally {
      share.settle();
    }
  }

  /** Turns of the derivation search, until so many clauses have been generated for each goal. */
  #derive(generated: number, steps: number): void {
    if (this.#isSettled || !this.#mayDerive) return;
    const share = new MeterShare(this.#meter, Math.max(1, steps));
    try {
      for (const goal of this.#goals) {
        while (goal.derivation === null && goal.search.generated < generated) {
          this.#work.report(`${this.#sought}: ${goal.search.generated} clauses`);
          const outcome = goal.search.next(share.meter);
          if (outcome.result === "saturated") {
            this.#saturated = true;
            return;
          }
          if (outcome.result === "derived") goal.derivation = outcome.derivation;
        }
        if (goal.derivation?.usesConclusion === false) {
          // The premises contradict each other: that is all there is to show.
          this.derived = [{ task: goal.task, derivation: goal.derivation, label: goal.label }];
          return;
        }
      }
    } catch (problem) {
      // That the share ended is no reason to stop.
      if (!(problem instanceof WorkEnded) || share.ended === "interrupted") throw problem;
      this.#ended = share.ended ?? problem.reason;
    } finally {
      share.settle();
    }
    if (this.#goals.every(({ derivation }) => derivation !== null))
      this.derived = this.#goals.map(({ task, derivation, label }) => ({
        task,
        derivation: derivation!,
        label,
      }));
  }
}

/** The conjunction of some formulas, nothing in them flattened: as the checker makes it. */
function all(formulas: readonly Formula[]): Formula {
  return formulas.length === 1 ? formulas[0]! : { kind: "and", parts: formulas };
}

function textOf(formula: Formula): string {
  return JSON.stringify(recordFormula(formula));
}

function formulasOf(axioms: readonly Axiom[]): readonly Formula[] {
  return axioms.map(({ formula }) => formula);
}
