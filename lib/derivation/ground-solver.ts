/**
 * What the instantiation-based turn wants of a solver for propositional clauses. This folder does not know the solver
 * of finite structures, so whoever asks for derivations hands in how to make one.
 */
import type { Meter } from "../logic/meter.ts";

export interface GroundSolver {
  /** Adds a variable; they are 1, 2, … */
  newVariable(): number;
  /** Adds a clause of signed literals; false once the clauses are contradictory by unit propagation alone. */
  addClause(literals: readonly number[]): boolean;
  /** @param meter pays; when it ends the search, its `ended` says why */
  solve(meter: Meter): "satisfiable" | "unsatisfiable" | "ended";
  /** The value of a variable in the model found last; false for variables that came later. */
  value(variable: number): boolean;
}

/**
 * @param onDerived must be told of every clause that the solver learns, in order, each a consequence by unit propagation
 *   of the clauses given and learned before; the empty one comes last when there is no model
 */
export type CreateSolver = (onDerived: (clause: readonly number[]) => void) => GroundSolver;
