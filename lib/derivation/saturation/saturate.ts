/**
 * Saturation: clauses are picked one by one, and all that follows from a picked clause and those picked before is added,
 * until the clause without literals appears or nothing new does (given-clause algorithm; Bachmair & Ganzinger 1994 for
 * the calculus). Cheap simplifications are done on every clause at its birth, with all unit clauses and unit
 * equations kept; full subsumption only on the clause that is picked.
 */
import type { Meter } from "../../logic/meter.ts";
import type { CreateSolver } from "../ground-solver.ts";
import type { ClauseTask, EngineOutcome } from "../refutation.ts";
import { CaseModel } from "./case-model.ts";
import { ACTIVE, ClauseStore, DELETED, FROZEN, GOAL, PARKED } from "./clauses.ts";
import { Draft, type DraftState } from "./draft.ts";
import { Inferences } from "./inferences.ts";
import { goalFunctions, orderingFor, type ReadClause, readClause } from "./input.ts";
import { ClauseHeap } from "./lists.ts";
import { atomOf, isNegative, type Ordering } from "./ordering.ts";
import { replay } from "./replay.ts";
import { RewriteIndex } from "./rewriting.ts";
import { Selection } from "./selection.ts";
import { parentsOf, Simplifier } from "./simplify.ts";
import { Splitting } from "./splitting.ts";
import type { Strategy } from "./strategy.ts";
import { Substitution, shifted } from "./substitution.ts";
import { SubsumptionIndex } from "./subsumption.ts";
import { HEADER, IDENTITY, TermBank } from "./terms.ts";
import { UnitIndex } from "./units.ts";
import { WorkClock } from "./work-clock.ts";

export * from "./strategy.ts";

export interface SaturationLimits {
  /** Clauses that the run may generate. */
  readonly clauses: number;
  /**
   * What it may hold in memory: literals of kept clauses, different terms, and nodes of the trees that find unit
   * clauses, together. Each takes some 20 to 60 bytes.
   */
  readonly literals: number;
}

/** Clauses with one of these bits are not picked. */
const UNPICKED = DELETED | ACTIVE | FROZEN | PARKED;

/**
 * Searches for a refutation. Each clause that an inference, a simplification or splitting makes is charged as a step.
 * @param createSolver for a strategy that splits
 * @throws WorkEnded when the meter says so
 */
export function saturate(
  task: ClauseTask,
  strategy: Strategy,
  limits: SaturationLimits,
  meter: Meter,
  createSolver: CreateSolver | null = null,
): EngineOutcome {
  if (strategy.isSplit && createSolver === null) throw new Error("splitting needs a propositional solver");
  return new Saturation(task, strategy, limits, meter, createSolver).run();
}

const NO_NAMES: readonly number[] = [];

/** Thrown inside a run to unwind it. */
class RunEnded extends Error {
  readonly reason: "steps" | "memory";
  constructor(reason: "steps" | "memory") {
    super(`run ended: ${reason}`);
    this.reason = reason;
  }
}

/** Thrown inside a run when the clause without literals has been stored, as the last one, or no case is left. */
class Refuted extends Error {
  readonly byCases: boolean;
  constructor(byCases: boolean) {
    super("refuted");
    this.byCases = byCases;
  }
}

class Saturation {
  readonly #task: ClauseTask;
  readonly #strategy: Strategy;
  readonly #limits: SaturationLimits;
  readonly #meter: Meter;
  readonly #clock: WorkClock;
  readonly #bank = new TermBank();
  readonly #store = new ClauseStore();
  readonly #input: readonly ReadClause[];
  readonly #ordering: Ordering;
  readonly #substitution = new Substitution(this.#bank);
  readonly #draft: Draft;
  readonly #units: UnitIndex;
  readonly #rewriting: RewriteIndex;
  readonly #subsumption: SubsumptionIndex;
  readonly #simplifier: Simplifier;
  readonly #inferences: Inferences;
  readonly #selection: Selection;
  readonly #waiting: ClauseHeap;
  readonly #isGoalFunction: readonly boolean[];
  readonly #splitting: Splitting;
  /** Null for a strategy that does not split. */
  readonly #cases: CaseModel | null;
  /** Whether some equation occurs positively, so that identity needs more than equality resolution. */
  readonly #hasEquality: boolean;
  #generated = 0;
  /** The clause with which inferences are being made; -1 when there is none. */
  #given = -1;
  /** All clauses before this one have been picked or deleted. */
  #oldest = 0;
  /** Whether a clause was dropped that is needed to say that nothing more follows. */
  #hasDropped = false;

  constructor(
    task: ClauseTask,
    strategy: Strategy,
    limits: SaturationLimits,
    meter: Meter,
    createSolver: CreateSolver | null,
  ) {
    this.#task = task;
    this.#strategy = strategy;
    this.#limits = limits;
    this.#meter = meter;
    const bank = this.#bank;
    const store = this.#store;
    const substitution = this.#substitution;
    const clock = new WorkClock(meter);
    this.#clock = clock;
    this.#input = task.clauses.map(({ clause }) => readClause(bank, clause));
    this.#ordering = orderingFor(bank, this.#input, strategy);
    this.#isGoalFunction = goalFunctions(bank, this.#input, task);
    this.#hasEquality = this.#input.some(({ literals }) =>
      literals.some((literal) => !isNegative(literal) && bank.words[atomOf(literal)] === IDENTITY),
    );
    this.#splitting = new Splitting(bank);
    this.#cases =
      strategy.isSplit && createSolver !== null
        ? new CaseModel(bank, store, this.#splitting, createSolver, meter, clock)
        : null;
    this.#draft = new Draft(bank, store, this.#ordering, substitution);
    this.#units = new UnitIndex(bank, store, substitution);
    this.#rewriting = new RewriteIndex(bank, store, this.#ordering, substitution);
    this.#subsumption = new SubsumptionIndex(bank, store, substitution, clock);
    this.#simplifier = new Simplifier(bank, store, this.#draft, this.#units, this.#rewriting, clock);
    this.#inferences = new Inferences(
      bank,
      store,
      this.#draft,
      this.#ordering,
      substitution,
      clock,
      (state) => this.#conclude(state),
    );
    this.#selection = new Selection(bank, store, this.#ordering, strategy, (literal) =>
      this.#inferences.partnersOf(literal),
    );
    this.#waiting = new ClauseHeap(store);
  }

  run(): EngineOutcome {
    try {
      this.#takeInput();
      this.#saturate();
    } catch (error) {
      if (error instanceof RunEnded) return { result: "gave-up", reason: error.reason };
      if (!(error instanceof Refuted)) throw error;
      const refutation = replay(
        this.#bank,
        this.#store,
        this.#draft,
        this.#substitution,
        this.#splitting,
        this.#input,
        this.#task.formulas,
        error.byCases ? this.#cases!.refutation() : [],
      );
      return { result: "refuted", refutation };
    }
    const isComplete = !this.#hasDropped && !this.#strategy.isSupported;
    return isComplete ? { result: "saturated" } : { result: "gave-up", reason: "incomplete" };
  }

  #takeInput(): void {
    const hasGoal = this.#task.clauses.some(({ goal }) => goal);
    this.#input.forEach(({ literals, names }, number) => {
      const isGoal = this.#task.clauses[number]!.goal;
      const state = this.#simplifier.simplify(this.#draft.input(number, literals, names.length), -1);
      this.#keep(state, isGoal ? GOAL : 0);
    });
    if (!this.#strategy.isSupported || !hasGoal) return;
    const { count } = this.#store;
    for (let clause = 0; clause < count; clause += 1)
      if (!this.#store.is(clause, DELETED | GOAL)) this.#activate(clause);
  }

  #saturate(): void {
    const { byAge, byWeight } = this.#strategy;
    for (let turn = 0; ; turn = (turn + 1) % (byAge + byWeight)) {
      if (this.#cases !== null) this.#updateCases(this.#cases);
      const clause = this.#pick(turn < byAge);
      if (clause < 0) return;
      this.#process(clause);
    }
  }

  /** Goes over to a model of the names in which all clauses of names are true. */
  #updateCases(cases: CaseModel): void {
    for (let back = cases.update(); back === null || back.length > 0; back = cases.update()) {
      if (back === null) throw new Refuted(true);
      this.#rewriting.forget();
      for (const clause of back) this.#bringBack(clause);
    }
  }

  /**
   * Lets a clause be picked that could not be in the last model. One that has been active has not met what was active
   * since: a copy of it will.
   */
  #bringBack(old: number): void {
    const store = this.#store;
    if (store.is(old, DELETED | FROZEN | PARKED)) return;
    if (!store.is(old, ACTIVE)) {
      this.#waiting.push(old);
      this.#oldest = Math.min(this.#oldest, old);
      return;
    }
    store.mark(old, DELETED);
    this.#charge();
    this.#draft.copy(old);
    this.#draft.settle();
    this.#enter(store.is(old, GOAL) ? GOAL : 0);
  }

  #pick(byAge: boolean): number {
    const store = this.#store;
    if (byAge) {
      while (this.#oldest < store.count) {
        const clause = this.#oldest++;
        this.#clock.tick(1);
        if (!store.is(clause, UNPICKED)) return clause;
      }
      return -1;
    }
    for (;;) {
      const clause = this.#waiting.pop();
      if (clause < 0 || !store.is(clause, UNPICKED)) return clause;
    }
  }

  #process(picked: number): void {
    const clause = this.#refresh(picked);
    if (clause < 0) return;
    const store = this.#store;
    const subsuming = this.#subsumption.findSubsuming(clause);
    if (subsuming >= 0) {
      this.#remove(clause, this.#namesOf(subsuming));
      return;
    }
    const names = this.#namesOf(clause);
    this.#subsumption.forSubsumed(clause, (other) => {
      const its = this.#namesOf(other);
      if (names.every((name) => its.includes(name))) store.mark(other, DELETED);
    });
    if (this.#hasEquality) this.#rewriteActive(clause);
    const eligible = this.#activate(clause);
    this.#given = clause;
    this.#inferences.infer(clause, eligible, this.#hasEquality);
    this.#given = -1;
  }

  #namesOf(clause: number): readonly number[] {
    return this.#cases === null ? NO_NAMES : this.#cases.namesOf(clause);
  }

  /** Takes a clause out that follows from others which have these names. */
  #remove(clause: number, names: readonly number[]): void {
    if (this.#cases === null) this.#store.mark(clause, DELETED);
    else this.#cases.remove(clause, names);
  }

  /** The picked clause, simplified by what has come since it was made; -1 when nothing is left of it. */
  #refresh(picked: number): number {
    const draft = this.#draft;
    const state = this.#simplifier.simplify(draft.copy(picked), picked, true);
    if (state === "clause" && draft.recordLength === 2) return picked;
    const { subsuming } = this.#simplifier;
    this.#remove(picked, [...this.#namesInDraft(), ...(subsuming < 0 ? NO_NAMES : this.#namesOf(subsuming))]);
    if (state === "true") return -1;
    this.#charge();
    return this.#keep(state, this.#store.is(picked, GOAL) ? GOAL : 0);
  }

  #namesInDraft(): readonly number[] {
    if (this.#cases === null) return NO_NAMES;
    const literals = Array.from(this.#draft.literals.subarray(0, this.#draft.length));
    return literals.filter((literal) => this.#isName(literal));
  }

  #isName(literal: number): boolean {
    return this.#bank.isName[this.#bank.words[atomOf(literal)]!]!;
  }

  /** Puts active clauses back in which a new unit equation rewrites something. */
  #rewriteActive(clause: number): void {
    const store = this.#store;
    if (store.length(clause) - this.#namesOf(clause).length !== 1) return;
    const literal = store.literal(clause, 0);
    if (isNegative(literal) || this.#bank.words[atomOf(literal)] !== IDENTITY) return;
    const found = new Set<number>();
    for (let side = 0; side < 2; side += 1)
      this.#inferences.forRewritable(this.#bank.words[atomOf(literal) + HEADER + side]!, (other) =>
        found.add(other),
      );
    for (const other of found) {
      if (other === clause || store.is(other, DELETED)) continue;
      const state = this.#simplifier.simplify(this.#draft.copy(other), other);
      if (state === "clause" && this.#draft.recordLength === 2) continue;
      store.mark(other, DELETED);
      if (state === "true") continue;
      this.#charge();
      this.#keep(state, store.is(other, GOAL) ? GOAL : 0);
    }
  }

  #activate(clause: number): readonly number[] {
    this.#store.mark(clause, ACTIVE);
    const eligible = this.#selection.eligible(clause);
    if (this.#store.length(clause) - this.#namesOf(clause).length > 1) this.#subsumption.add(clause);
    this.#inferences.add(clause, eligible, this.#hasEquality);
    return eligible;
  }

  #charge(): void {
    if (this.#generated >= this.#limits.clauses) throw new RunEnded("steps");
    this.#generated += 1;
    this.#meter.charge(1000);
  }

  #conclude(state: DraftState): void {
    this.#charge();
    const simplified = this.#simplifier.simplify(state, -1);
    if (simplified === "true") return;
    const isFromGoal = parentsOf(this.#draft.record.subarray(0, this.#draft.recordLength)).some((parent) =>
      this.#store.is(parent, GOAL),
    );
    this.#keep(simplified, isFromGoal ? GOAL : 0);
  }

  /** Stores the draft, or what it is split into. The number of the clause, -1 if there is none that can be picked. */
  #keep(state: DraftState, goal: number): number {
    if (this.#cases === null || state !== "clause") return this.#add(state, goal);
    const { names, state: named } = this.#splitting.split(this.#draft);
    if (names.length === 0) return this.#add(state, goal);
    this.#add(named, goal);
    for (const name of names) {
      const defined = this.#splitting.define(name, this.#draft);
      if (defined === null) continue;
      this.#charge();
      this.#keep(this.#simplifier.simplify(defined, -1), goal);
    }
    return -1;
  }

  /** Stores the draft if it is new and not too large; -1 otherwise. */
  #add(state: DraftState, goal: number): number {
    if (state === "true") return -1;
    const draft = this.#draft;
    if (state === "too-large" || !draft.settle() || this.#isTooLarge()) {
      this.#hasDropped = true;
      return -1;
    }
    if (this.#store.has(draft.literals, draft.length)) return -1;
    return this.#enter(goal);
  }

  /** Stores the draft, which has been settled. */
  #enter(goal: number): number {
    const draft = this.#draft;
    const store = this.#store;
    const key = this.#weigh() * (goal !== 0 ? this.#strategy.goalFactor : this.#strategy.otherFactor);
    const clause = store.add(
      draft.literals,
      draft.length,
      draft.variables,
      goal,
      key,
      draft.record,
      draft.recordLength,
    );
    if (draft.length === 0) throw new Refuted(false);
    if (this.#kept() > this.#limits.literals) throw new RunEnded("memory");
    const names = this.#namesOf(clause);
    if (names.length > 0) this.#cases!.add(clause, names);
    if (names.length === store.length(clause)) return -1;
    this.#waiting.push(clause);
    if (names.length + 1 === store.length(clause)) this.#keepUnit(clause);
    return store.is(clause, UNPICKED) ? -1 : clause;
  }

  /** What the run keeps, in the measure of its limit. */
  #kept(): number {
    const names = this.#splitting.size + (this.#cases === null ? 0 : this.#cases.size);
    return this.#store.literals + this.#bank.count + this.#units.size + this.#rewriting.size + names;
  }

  #keepUnit(clause: number): void {
    const literal = this.#store.literal(clause, 0);
    const atom = atomOf(literal);
    this.#units.add(clause);
    const isEquation = this.#bank.words[atom] === IDENTITY;
    if (isEquation && !isNegative(literal)) this.#rewriting.add(clause);
    if (isEquation) return;
    const other = this.#units.findUnifiable(shifted(this.#bank, atom), !isNegative(literal));
    if (other < 0) return;
    this.#charge();
    this.#draft.setGiven(clause);
    this.#substitution.unify(atomOf(this.#draft.given[0]!), atomOf(this.#store.literal(other, 0)));
    const state = this.#draft.resolve(clause, 0, other, 0);
    this.#substitution.undo(0);
    this.#keep(state, GOAL);
    if (this.#given >= 0) this.#draft.setGiven(this.#given);
  }

  #isTooLarge(): boolean {
    const { literals, length } = this.#draft;
    let weight = 0;
    let count = 0;
    for (let k = 0; k < length; k += 1) {
      const atom = atomOf(literals[k]!);
      if (this.#isName(literals[k]!)) continue;
      count += 1;
      weight += this.#bank.weight(atom);
      if (this.#bank.depth(atom) > this.#strategy.mostDepth) return true;
    }
    return count > this.#strategy.mostLiterals || weight > this.#strategy.mostWeight;
  }

  #weigh(): number {
    const { literals, length } = this.#draft;
    let weight = 0;
    for (let k = 0; k < length; k += 1) {
      const atom = atomOf(literals[k]!);
      weight += this.#isName(literals[k]!)
        ? this.#strategy.nameWeight
        : this.#strategy.literalWeight + this.#weighTerm(atom);
    }
    return weight;
  }

  #weighTerm(term: number): number {
    const strategy = this.#strategy;
    if (term < 0) return strategy.variableWeight;
    const bank = this.#bank;
    const symbol = bank.words[term]!;
    let weight = bank.isRelation[symbol]
      ? strategy.relationWeight
      : this.#isGoalFunction[symbol]
        ? strategy.goalFunctionWeight
        : strategy.functionWeight;
    for (let k = 0; k < bank.arities[symbol]!; k += 1)
      weight += this.#weighTerm(bank.words[term + HEADER + k]!);
    return weight;
  }
}
