/** Derivations of a conclusion from premises, as inquiries ask for them, and one attempt at one. */
import type { DerivationFact } from "../evidence/format.ts";
import type { Formula } from "../logic/formula.ts";
import type { Meter } from "../logic/meter.ts";
import { FormulaTooLarge } from "../logic/records/formulas.ts";
import { assemble } from "./assemble.ts";
import { refuteByCases } from "./cases.ts";
import { complementOutcome, complementTask } from "./complement.ts";
import type { CreateSolver } from "./ground-solver.ts";
import { instantiate } from "./instantiation/instantiate.ts";
import { type Preparation, type Prepared, prepare } from "./prepare.ts";
import type { EngineOutcome } from "./refutation.ts";
import { saturate } from "./saturation/saturate.ts";
import type { Strategy } from "./saturation/strategy.ts";

export interface DerivationTask {
  /** Closed. */
  readonly premises: readonly Formula[];
  /** Closed; null to derive a contradiction. */
  readonly conclusion: Formula | null;
}

export interface Derivation {
  /** The premises that are used, by their places in the task, in ascending order. */
  readonly premises: readonly number[];
  /** Whether the negated conclusion is used; if not, the premises contradict each other. */
  readonly usesConclusion: boolean;
  /** Numbered for just these premises, and for the negated conclusion just if it is used. */
  readonly record: Pick<DerivationFact, "made" | "lines">;
}

export type TurnOutcome =
  | { readonly result: "derived"; readonly derivation: Derivation }
  /** There is no derivation: premises and negated conclusion have a model together, perhaps an infinite one. */
  | { readonly result: "saturated" }
  | { readonly result: "gave-up"; readonly reason: "steps" | "memory" | "incomplete" };

/** What refutes the clauses: saturation by a strategy, instances of the clauses, or cases. */
export type Engine =
  | {
      readonly by: "saturation";
      readonly strategy: Strategy;
      /** Whether it goes through complements of all relations (`complement.ts`); not where the strategy splits. */
      readonly complemented?: true;
    }
  | { readonly by: "instances" }
  /** Saturation in each case that closed parts with names leave. */
  | { readonly by: "cases"; readonly strategy: Strategy };

/** One bounded attempt. */
export interface Turn {
  readonly engine: Engine;
  readonly preparation: Preparation;
  /** Clauses that may be generated. */
  readonly clauses: number;
}

/** What saturation may keep in memory, in literals and terms: some 300 MB. */
const MOST_LITERALS = 8_000_000;
/** Literals of instances that may be kept, each of which is dearer: some 300 MB. */
const MOST_INSTANCE_LITERALS = 1_000_000;

/** The clauses for a turn; null when they would be too many. */
export function prepareTurn(task: DerivationTask, preparation: Preparation): Prepared | null {
  try {
    return prepare(task, preparation);
  } catch (problem) {
    if (problem instanceof FormulaTooLarge) return null;
    throw problem;
  }
}

/**
 * Tries to derive the conclusion in one turn.
 * @param prepared what {@link prepareTurn} gave for the turn
 * @param meter pays a step for each generated clause
 * @throws WorkEnded
 */
export function runTurn(
  task: DerivationTask,
  turn: Turn,
  prepared: Prepared,
  meter: Meter,
  createSolver: CreateSolver,
): TurnOutcome {
  const outcome = refute(turn, prepared, meter, createSolver);
  if (outcome.result === "refuted")
    return { result: "derived", derivation: assemble(task, prepared, outcome.refutation) };
  if (outcome.result === "saturated" && !prepared.isComplete)
    return { result: "gave-up", reason: "incomplete" };
  return outcome;
}

function refute(
  { engine, clauses }: Turn,
  prepared: Prepared,
  meter: Meter,
  createSolver: CreateSolver,
): EngineOutcome {
  if (engine.by === "saturation") {
    const { strategy, complemented = false } = engine;
    const task = complemented ? complementTask(prepared.task) : prepared.task;
    const outcome = saturate(task, strategy, { clauses, literals: MOST_LITERALS }, meter, createSolver);
    return complemented ? complementOutcome(outcome) : outcome;
  }
  if (engine.by === "cases") {
    const limits = { clauses, literals: MOST_LITERALS };
    return refuteByCases(prepared.task, engine.strategy, limits, meter, createSolver);
  }
  const limits = { instances: clauses, literals: MOST_INSTANCE_LITERALS };
  return instantiate(prepared.task, limits, meter, createSolver);
}
