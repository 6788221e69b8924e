/**
 * Refutation by cases. Where closed parts of the formulas have got names, "letters", each with its definition, some
 * clauses are about letters alone. A propositional solver says which letters may be true together; what these say, and
 * nothing else, is then given to saturation. If it is refuted, the letters that it needs cannot be true together,
 * which the solver is told; when the solver has no choice left, all is refuted. So a conclusion that is an equivalence or
 * a conjunction is derived piece by piece, with all that the case says at hand as clauses of their own (after the
 * architecture of Voronkov 2014, with closed parts in place of parts of clauses).
 */
import type { ClauseRecord, LiteralRecord, UseRecord } from "../evidence/format.ts";
import { type Meter, WorkEnded } from "../logic/meter.ts";
import type { CreateSolver, GroundSolver } from "./ground-solver.ts";
import { replay } from "./instantiation/replay.ts";
import type { ClauseTask, EngineOutcome, InputClause, Refutation, RefutationStep } from "./refutation.ts";
import { saturate } from "./saturation/saturate.ts";
import type { Strategy } from "./saturation/strategy.ts";

/**
 * @param strategy does not split
 * @param limits for all cases together
 * @throws WorkEnded
 */
export function refuteByCases(
  task: ClauseTask,
  strategy: Strategy,
  limits: { readonly clauses: number; readonly literals: number },
  meter: Meter,
  createSolver: CreateSolver,
): EngineOutcome {
  return new Cases(task, strategy, limits, meter, createSolver).run();
}

/** Whether some clause leaves a choice between letters. */
export function hasCases({ clauses }: ClauseTask): boolean {
  return clauses.some(({ clause }) => clause.length > 1 && clause.every(isLetter));
}

/** A clause of a task: if all letters of its guard are false, what is left holds. */
interface Guarded {
  readonly input: number;
  readonly guard: readonly LiteralRecord[];
  readonly rest: InputClause;
}

class Cases {
  readonly #task: ClauseTask;
  readonly #strategy: Strategy;
  readonly #limits: { readonly clauses: number; readonly literals: number };
  readonly #meter: Meter;
  readonly #solver: GroundSolver;
  readonly #learned: (readonly number[])[] = [];
  /** By name: the solver's variable; and the name of each variable. */
  readonly #variables = new Map<string, number>();
  readonly #names: string[] = [""];
  readonly #guarded: Guarded[] = [];
  /** Clauses about letters alone, and for each the step that has it. */
  readonly #given: (readonly number[])[] = [];
  readonly #givenSteps: number[] = [];
  readonly #steps: RefutationStep[] = [];
  /** By input clause: the step that has it. */
  readonly #inputSteps = new Map<number, number>();

  constructor(
    task: ClauseTask,
    strategy: Strategy,
    limits: { readonly clauses: number; readonly literals: number },
    meter: Meter,
    createSolver: CreateSolver,
  ) {
    this.#task = task;
    this.#strategy = strategy;
    this.#limits = limits;
    this.#meter = meter;
    this.#solver = createSolver((clause) => this.#learned.push([...clause]));
  }

  run(): EngineOutcome {
    for (const [input, one] of this.#task.clauses.entries()) {
      const guard = one.clause.filter(isLetter);
      for (const literal of guard) this.#literal(literal);
      if (one.clause.length === 0) {
        this.#inputStep(input);
        return this.#refuted();
      }
      if (guard.length === one.clause.length) this.#give(guard, this.#inputStep(input));
      else
        this.#guarded.push({
          input,
          guard,
          rest: { ...one, clause: one.clause.filter((literal) => !isLetter(literal)) },
        });
    }
    const first = this.#meter.left;
    for (;;) {
      const outcome = this.#solver.solve(this.#meter);
      if (outcome === "ended") throw new WorkEnded(this.#meter.ended ?? "memory");
      if (outcome === "unsatisfiable") return this.#refute();
      const spent = (first - this.#meter.left) / 1000;
      const clauses = Math.floor(this.#limits.clauses - spent);
      if (clauses <= 0) return { result: "gave-up", reason: "steps" };
      const stopped = this.#refuteCase(clauses);
      if (stopped !== null) return stopped;
    }
  }

  /** Refutes what the letters of the last model say, and tells the solver; an outcome when nothing is left to do. */
  #refuteCase(clauses: number): EngineOutcome | null {
    const active = this.#guarded.filter(({ guard }) => !guard.some((literal) => this.#isTrue(literal)));
    const task = { clauses: active.map(inCase), formulas: this.#task.formulas };
    const outcome = saturate(task, this.#strategy, { ...this.#limits, clauses }, this.#meter);
    if (outcome.result !== "refuted") return outcome;
    const guard = this.#lift(outcome.refutation, active);
    // No letter was needed: that is all there is to show.
    if (guard.length === 0) return this.#refuted();
    this.#give(guard, this.#steps.length - 1);
    return null;
  }

  /** Adds the steps of a case, each with the guards of what it uses; the guard of the last one. */
  #lift({ definitions, steps }: Refutation, active: readonly Guarded[]): readonly LiteralRecord[] {
    if (definitions.length > 0) throw new Error("a strategy for cases must not split");
    /** By step of the case: the step here, and its guard. */
    const lifted: { readonly step: number; readonly guard: ReadonlyMap<string, LiteralRecord> }[] = [];
    for (const step of steps) {
      const guard = new Map<string, LiteralRecord>();
      switch (step.from) {
        case "input": {
          const { input, guard: own } = active[step.input]!;
          for (const literal of own) guard.set(JSON.stringify(literal), literal);
          lifted.push({ step: this.#inputStep(input), guard });
          break;
        }
        case "inference": {
          for (const [used] of step.uses)
            for (const [key, literal] of lifted[used]!.guard) guard.set(key, literal);
          const uses = step.uses.map(([used, terms]): UseRecord => [lifted[used]!.step, terms]);
          lifted.push({
            step: this.#add({ from: "inference", clause: [...step.clause, ...guard.values()], uses }),
            guard,
          });
          break;
        }
        default:
          lifted.push({ step: this.#add(step), guard });
      }
    }
    const last = lifted.at(-1)!;
    // Where nothing had to be inferred, the last step is not the last one here.
    if (last.step !== this.#steps.length - 1)
      this.#add({ from: "inference", clause: [...last.guard.values()], uses: [[last.step, {}]] });
    return [...last.guard.values()];
  }

  #refute(): EngineOutcome {
    const end = this.#learned.findIndex((clause) => clause.length === 0);
    if (end < 0) throw new Error("the solver has not told of the clauses that it derived");
    const needed = replay(this.#names.length - 1, this.#given, this.#learned.slice(0, end + 1), this.#meter);
    const replayed: number[] = [];
    for (const { clause, given, steps } of needed) {
      const uses = [
        ...given.map((place): UseRecord => [this.#givenSteps[place]!, {}]),
        ...steps.map((step): UseRecord => [replayed[step]!, {}]),
      ];
      replayed.push(this.#add({ from: "inference", clause: this.#record(clause), uses }));
    }
    return this.#refuted();
  }

  #refuted(): EngineOutcome {
    return { result: "refuted", refutation: { definitions: [], steps: this.#steps } };
  }

  /** A clause about letters alone, for the solver. */
  #give(clause: readonly LiteralRecord[], step: number): void {
    const literals = [...new Set(clause.map((literal) => this.#literal(literal)))];
    // What is true in any case says nothing.
    if (literals.some((literal) => literals.includes(-literal))) return;
    this.#given.push(literals);
    this.#givenSteps.push(step);
    this.#solver.addClause(literals);
  }

  #record(clause: readonly number[]): ClauseRecord {
    return clause.map((literal) => {
      const atom = ["is", this.#names[Math.abs(literal)]!] as const;
      return literal > 0 ? atom : ["not", atom];
    });
  }

  #literal(literal: LiteralRecord): number {
    const name = letterOf(literal)!;
    let variable = this.#variables.get(name);
    if (variable === undefined) {
      variable = this.#solver.newVariable();
      this.#variables.set(name, variable);
      this.#names[variable] = name;
    }
    return literal[0] === "not" ? -variable : variable;
  }

  #isTrue(literal: LiteralRecord): boolean {
    const signed = this.#literal(literal);
    return this.#solver.value(Math.abs(signed)) === signed > 0;
  }

  #inputStep(input: number): number {
    let step = this.#inputSteps.get(input);
    if (step === undefined) {
      step = this.#add({ from: "input", input });
      this.#inputSteps.set(input, step);
    }
    return step;
  }

  #add(step: RefutationStep): number {
    return this.#steps.push(step) - 1;
  }
}

/** What is left of a clause in its case. What comes of a letter that is false is what the case is to refute. */
function inCase({ guard, rest }: Guarded): InputClause {
  return { ...rest, goal: rest.goal && guard.some((literal) => literal[0] !== "not") };
}

function isLetter(literal: LiteralRecord): boolean {
  return letterOf(literal) !== null;
}

/** The relation without places that a literal is about; null when it is about something else. */
function letterOf(literal: LiteralRecord): string | null {
  const atom = literal[0] === "not" ? literal[1] : literal;
  return atom[0] === "is" && atom.length === 2 ? atom[1] : null;
}
