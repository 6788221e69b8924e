/**
 * Refutation by instances (Ganzinger & Korovin 2003). The clauses with one constant in place of all variables are
 * given to a propositional solver. If it refutes them, so are the clauses. If not, its model selects a literal of
 * each clause; where the selected literals of two clauses are opposite up to unification, the model cannot stand for
 * both, and their instances under the unifier join the clauses. What identity is is said by clauses.
 *
 * Where there are no functions with arguments, few constants and few variables, all instances over the constants are
 * given at once, which decides.
 */
import type { ClauseRecord, LiteralRecord, TermRecord, UseRecord } from "../../evidence/format.ts";
import { type Meter, WorkEnded } from "../../logic/meter.ts";
import type { CreateSolver, GroundSolver } from "../ground-solver.ts";
import type { ClauseTask, EngineOutcome, RefutationStep } from "../refutation.ts";
import { type BaseClause, baseClauses, eachFunction } from "./base-clauses.ts";
import { type Instance, InstanceMaker, type MadeInstance } from "./instances.ts";
import { replay } from "./replay.ts";
import { WaitingList } from "./waiting.ts";

export interface InstantiationLimits {
  /** Instances that may be made. */
  readonly instances: number;
  /** Literals that all instances together may have. */
  readonly literals: number;
}

/** Symbols and variables that an instance may have. */
const MOST_WEIGHT = 120;
/** Thousandths of a step for an attempt to unify. */
const ATTEMPT = 4;
/** … for an instance that is known already or is left out. */
const KNOWN = 200;
/** … and for a new one. */
const STEP = 1000;
/** Instances that are to take part before the solver is asked again, although its last model is not one any more. */
const PICKS = 4;

/**
 * @param meter pays a step for each instance, and what the solver and the attempts to unify cost
 * @throws WorkEnded
 */
export function instantiate(
  task: ClauseTask,
  limits: InstantiationLimits,
  meter: Meter,
  createSolver: CreateSolver,
): EngineOutcome {
  return new Instantiation(task, limits, meter, createSolver).run();
}

class Instantiation {
  readonly #task: ClauseTask;
  readonly #limits: InstantiationLimits;
  readonly #meter: Meter;

  // The ground clauses

  readonly #solver: GroundSolver;
  readonly #maker: InstanceMaker;
  /** What stands for the filler in evidence: itself, or a variable where there are no constants. */
  readonly #fillerRecord: TermRecord;
  #solverVariables = 0;
  /** The ground clauses that the solver has, and the instances that they come from. */
  readonly #ground: { readonly clause: readonly number[]; readonly instance: Instance }[] = [];
  /** What the solver has learned. */
  readonly #learned: (readonly number[])[] = [];
  /** Ground clauses that the last model makes false. */
  #falsified = 0;

  // The instances

  readonly #first: Instance[] = [];
  #count = 0;
  #literals = 0;
  /** Whether some instance was left out. */
  #isPartial = false;
  readonly #waiting = new WaitingList();
  /** The instances that take part, and by which literals, in the order in which they began to. */
  readonly #active = new Map<Instance, number>();
  /** Active instances by symbol and sign of their literals, see {@link slot}. */
  readonly #index = new Map<number, Set<Instance>>();

  constructor(task: ClauseTask, limits: InstantiationLimits, meter: Meter, createSolver: CreateSolver) {
    this.#task = task;
    this.#limits = limits;
    this.#meter = meter;
    this.#solver = createSolver((clause) => this.#learned.push([...clause]));
    const filler = constantsOf(task.clauses.map(({ clause }) => clause))[0] ?? null;
    this.#fillerRecord = filler === null ? "x" : [filler];
    this.#maker = new InstanceMaker(filler ?? "", () => this.#newVariable(), MOST_WEIGHT);
  }

  run(): EngineOutcome {
    const bases = baseClauses(this.#task.clauses);
    const empty = bases.find(({ record }) => record.length === 0);
    if (empty !== undefined) return refuted([{ from: "input", input: empty.input! }]);
    for (const base of bases) {
      const instance = this.#add(this.#maker.first(base));
      if (instance !== null) this.#first.push(instance);
    }
    const constants = this.#constants(bases);
    if (constants !== null) return this.#decide(constants);
    for (const instance of this.#first) this.#waiting.add(instance);
    return this.#search();
  }

  // The ground clauses

  #newVariable(): number {
    this.#solverVariables += 1;
    return this.#solver.newVariable();
  }

  /** Gives an instance to the solver; null when there is none. */
  #add(made: MadeInstance): Instance | null {
    if (typeof made === "string") {
      this.#meter.charge(KNOWN);
      if (made === "too-large") this.#isPartial = true;
      return null;
    }
    this.#meter.charge(STEP);
    this.#count += 1;
    this.#literals += made.literals.length;
    const clause = [...new Set(made.ground)];
    if (clause.some((literal) => clause.includes(-literal))) return made;
    this.#ground.push({ clause, instance: made });
    if (!clause.some((literal) => this.#isTrue(literal))) this.#falsified += 1;
    this.#solver.addClause(clause);
    return made;
  }

  #isTrue(literal: number): boolean {
    return this.#solver.value(Math.abs(literal)) === literal > 0;
  }

  /** Whether the ground clauses have a model, which is then the one to go by. */
  #hasModel(): boolean {
    this.#falsified = 0;
    const outcome = this.#solver.solve(this.#meter);
    if (outcome === "ended") throw new WorkEnded(this.#meter.ended ?? "memory");
    return outcome === "satisfiable";
  }

  // All instances over the constants

  /** The constants, when all instances over them decide and are few enough; null otherwise. */
  #constants(bases: readonly BaseClause[]): readonly number[] | null {
    const records = bases.map(({ record }) => record);
    if (hasProperFunctions(records)) return null;
    const names = constantsOf(records);
    const { bank } = this.#maker;
    const constants =
      names.length === 0
        ? [this.#maker.filler]
        : names.map((name) => bank.make(bank.symbol(name, 0, false), new Int32Array(0), 0));
    const count = bases.reduce((sum, { variables }) => sum + constants.length ** variables.length, 0);
    return count <= this.#limits.instances ? constants : null;
  }

  #decide(constants: readonly number[]): EngineOutcome {
    for (const first of this.#first) {
      const places = first.base.variables.map((_, place) => place);
      for (let number = 0; number < constants.length ** places.length; number += 1) {
        // The digits of the number choose the constants.
        const terms = places.map(
          (place) => constants[Math.floor(number / constants.length ** place) % constants.length]!,
        );
        this.#add(this.#maker.at(first, terms));
      }
    }
    return this.#hasModel() ? this.#exhausted() : this.#refute();
  }

  // The search

  #search(): EngineOutcome {
    while (this.#hasModel()) {
      this.#deactivate();
      for (let picks = 0; this.#falsified === 0 || picks < PICKS; picks += 1) {
        const given = this.#waiting.take();
        if (given === null) break;
        const selected = this.#select(given);
        if (selected < 0) {
          this.#waiting.add(given);
          break;
        }
        this.#activate(given, selected);
        this.#combine(given, given.literals[selected]!);
        if (this.#count >= this.#limits.instances) return { result: "gave-up", reason: "steps" };
        if (this.#literals >= this.#limits.literals) return { result: "gave-up", reason: "memory" };
      }
      if (this.#falsified === 0 && this.#waiting.size === 0) return this.#exhausted();
    }
    return this.#refute();
  }

  /** The model stands for all instances that there are. */
  #exhausted(): EngineOutcome {
    return this.#isPartial ? { result: "gave-up", reason: "incomplete" } : { result: "saturated" };
  }

  /** The literal by which an instance takes part: true in the model, ground if there is such a one, light. */
  #select(instance: Instance): number {
    const { bank } = this.#maker;
    let best = -1;
    let least = Number.POSITIVE_INFINITY;
    instance.ground.forEach((literal, place) => {
      if (!this.#isTrue(literal)) return;
      const atom = instance.literals[place]! >> 1;
      const cost = bank.weight(atom) + (bank.isGround(atom) ? 0 : MOST_WEIGHT);
      if (cost < least) {
        least = cost;
        best = place;
      }
    });
    return best;
  }

  #activate(instance: Instance, selected: number): void {
    this.#active.set(instance, selected);
    const key = this.#slot(instance.literals[selected]!);
    const set = this.#index.get(key);
    if (set === undefined) this.#index.set(key, new Set([instance]));
    else set.add(instance);
  }

  /** Takes back the instances whose selected literals the model makes false. */
  #deactivate(): void {
    for (const [instance, selected] of this.#active) {
      if (this.#isTrue(instance.ground[selected]!)) continue;
      this.#active.delete(instance);
      this.#index.get(this.#slot(instance.literals[selected]!))!.delete(instance);
      this.#waiting.add(instance);
    }
    this.#meter.charge(this.#active.size);
  }

  /** Twice the symbol of a literal, and one more when it is negated. */
  #slot(literal: number): number {
    return 2 * this.#maker.bank.words[literal >> 1]! + (literal & 1);
  }

  /** Makes the instances under which a selected literal is opposite to others. */
  #combine(given: Instance, literal: number): void {
    const { substitution } = this.#maker;
    for (const partner of this.#index.get(this.#slot(literal) ^ 1) ?? []) {
      if (given.isGround && partner.isGround) continue;
      this.#meter.charge(ATTEMPT);
      const opposite = partner.literals[this.#active.get(partner)!]! >> 1;
      if (substitution.unify(literal >> 1, this.#maker.shifted(opposite))) {
        for (const [instance, isShifted] of [
          [given, false],
          [partner, true],
        ] as const) {
          if (this.#maker.isRenamed(instance, isShifted)) continue;
          const made = this.#add(this.#maker.instance(instance, isShifted));
          if (made !== null) this.#waiting.add(made);
        }
      }
      substitution.undo(0);
    }
  }

  // The refutation

  #refute(): EngineOutcome {
    const end = this.#learned.findIndex((clause) => clause.length === 0);
    if (end < 0) throw new Error("the solver has not told of the clauses that it derived");
    const needed = replay(
      this.#solverVariables,
      this.#ground.map(({ clause }) => clause),
      this.#learned.slice(0, end + 1),
      this.#meter,
    );
    const steps: RefutationStep[] = [];
    const baseSteps = new Map<BaseClause, number>();
    const stepOf = (base: BaseClause): number => {
      let step = baseSteps.get(base);
      if (step === undefined) {
        step =
          steps.push(
            base.input === null
              ? { from: "identity", clause: base.record }
              : { from: "input", input: base.input },
          ) - 1;
        baseSteps.set(base, step);
      }
      return step;
    };
    const replayed: number[] = [];
    for (const { clause, given, steps: earlier } of needed) {
      const uses = [
        ...given.map((place): UseRecord => {
          const { instance } = this.#ground[place]!;
          return [stepOf(instance.base), this.#maker.record(instance, this.#fillerRecord)];
        }),
        ...earlier.map((step): UseRecord => [replayed[step]!, {}]),
      ];
      const record = clause.map((literal): LiteralRecord => {
        const atom = this.#maker.atomRecord(Math.abs(literal), this.#fillerRecord);
        return literal > 0 ? atom : ["not", atom];
      });
      replayed.push(steps.push({ from: "inference", clause: record, uses }) - 1);
    }
    return refuted(steps);
  }
}

function refuted(steps: readonly RefutationStep[]): EngineOutcome {
  return { result: "refuted", refutation: { definitions: [], steps } };
}

/** The constants of some clauses, in the order they occur. */
function constantsOf(clauses: readonly ClauseRecord[]): readonly string[] {
  const found = new Set<string>();
  eachFunction(clauses, (name, args) => {
    if (args === 0) found.add(name);
  });
  return [...found];
}

function hasProperFunctions(clauses: readonly ClauseRecord[]): boolean {
  let found = false;
  eachFunction(clauses, (_, args) => {
    if (args > 0) found = true;
  });
  return found;
}
