/**
 * Counting the models of clauses by independent parts: clauses that share no variable, directly or through others,
 * can be counted apart and the counts multiplied (Bayardo & Pehoushek 2000, there at every node of a search).
 */
import type { Meter } from "../logic/meter.ts";
import type { ClauseSink } from "./circuit.ts";
import { Solver } from "./sat/solver.ts";

/** Clauses looked at before the meter hears of it. */
const METERED_AT_ONCE = 1024;
/** Literals that a list of clauses may hold before it gives up with the reason `memory`. */
const LITERALS_BOUND = 30_000_000;

/** A list of clauses, as a sink. */
export class ClauseList implements ClauseSink {
  readonly clauses: (readonly number[])[] = [];
  variableCount = 0;
  #literals = 0;
  readonly #meter: Meter;

  constructor(meter: Meter) {
    this.#meter = meter;
  }

  newVariable(): number {
    this.variableCount += 1;
    return this.variableCount;
  }

  addClause(literals: readonly number[]): void {
    this.#literals += literals.length;
    if (this.#literals > LITERALS_BOUND) this.#meter.endForMemory();
    this.clauses.push([...literals]);
  }
}

/**
 * How many assignments to the variables `over`, which are distinct, extend to an assignment to all variables that
 * makes all clauses true. Null when the meter ends; its `ended` says why.
 * @throws WorkEnded as well
 */
export function countAssignments(list: ClauseList, over: readonly number[], meter: Meter): bigint | null {
  const simplified = propagateUnits(list, meter);
  if (simplified === null) return 0n;
  const { clauses, values } = simplified;
  const parts = partition(list.variableCount, clauses, meter);
  const isOver = new Uint8Array(list.variableCount + 1);
  for (const variable of over) isOver[variable] = 1;
  let free = 0;
  const members = new Map<number, number[]>();
  const occurs = new Uint8Array(list.variableCount + 1);
  const byPart = new Map<number, (readonly number[])[]>();
  for (const clause of metered(clauses, meter)) {
    for (const literal of clause) occurs[Math.abs(literal)] = 1;
    const part = parts[Math.abs(clause[0]!)]!;
    const known = byPart.get(part);
    if (known === undefined) byPart.set(part, [clause]);
    else known.push(clause);
  }
  for (let variable = 1; variable <= list.variableCount; variable += 1) {
    if (occurs[variable] === 0) {
      if (isOver[variable] === 1 && values[variable] === 0) free += 1;
      continue;
    }
    const part = parts[variable]!;
    const known = members.get(part);
    if (known === undefined) members.set(part, [variable]);
    else known.push(variable);
  }
  let count = 1n << BigInt(free);
  for (const [part, variables] of members) {
    const own = countPart(variables, byPart.get(part)!, isOver, meter);
    if (own === null) return null;
    if (own === 0) return 0n;
    count *= BigInt(own);
  }
  return count;
}

/** Counts one part by enumeration. */
function countPart(
  variables: readonly number[],
  clauses: readonly (readonly number[])[],
  isOver: Uint8Array,
  meter: Meter,
): number | null {
  const solver = new Solver();
  const renamed = new Map(variables.map((variable) => [variable, solver.newVariable()]));
  for (const clause of metered(clauses, meter))
    solver.addClause(clause.map((literal) => Math.sign(literal) * renamed.get(Math.abs(literal))!));
  const over = variables
    .filter((variable) => isOver[variable] === 1)
    .map((variable) => renamed.get(variable)!);
  let count = 0;
  const end = solver.enumerate(meter, over, () => {
    count += 1;
    return true;
  });
  return end === "complete" ? count : null;
}

interface Simplified {
  /** Those that are not true yet, without false literals. */
  readonly clauses: readonly (readonly number[])[];
  /** By variable: 1 true, −1 false, 0 not settled by unit clauses. */
  readonly values: Int8Array;
}

/** Carries out what unit clauses say; null when that is contradictory. */
function propagateUnits(list: ClauseList, meter: Meter): Simplified | null {
  const values = new Int8Array(list.variableCount + 1);
  const truthOf = (literal: number) => (literal > 0 ? values[literal]! : -values[-literal]!);
  let clauses: readonly (readonly number[])[] = list.clauses;
  for (let settled = true; settled; ) {
    settled = false;
    const rest: (readonly number[])[] = [];
    for (const clause of metered(clauses, meter)) {
      if (clause.some((literal) => truthOf(literal) > 0)) continue;
      const open = clause.some((literal) => truthOf(literal) < 0)
        ? clause.filter((literal) => truthOf(literal) === 0)
        : clause;
      if (open.length === 0) return null;
      if (open.length === 1) {
        values[Math.abs(open[0]!)] = Math.sign(open[0]!);
        settled = true;
      } else rest.push(open);
    }
    clauses = rest;
  }
  return { clauses, values };
}

/** By variable: the number of its part, which is one of the part's variables. */
function partition(variableCount: number, clauses: readonly (readonly number[])[], meter: Meter): Int32Array {
  const parents = Int32Array.from({ length: variableCount + 1 }, (_, variable) => variable);
  const rootOf = (variable: number) => {
    let root = variable;
    while (parents[root] !== root) {
      parents[root] = parents[parents[root]!]!;
      root = parents[root]!;
    }
    return root;
  };
  for (const clause of metered(clauses, meter)) {
    const first = rootOf(Math.abs(clause[0]!));
    for (const literal of clause) parents[rootOf(Math.abs(literal))] = first;
  }
  for (let variable = 1; variable <= variableCount; variable += 1) parents[variable] = rootOf(variable);
  return parents;
}

/** The clauses, while the meter is told of them. */
function* metered(
  clauses: readonly (readonly number[])[],
  meter: Meter,
): Generator<readonly number[], void, undefined> {
  for (let from = 0; from < clauses.length; from += METERED_AT_ONCE) {
    const to = Math.min(clauses.length, from + METERED_AT_ONCE);
    meter.charge(to - from);
    for (let at = from; at < to; at += 1) yield clauses[at]!;
  }
}
