/**
 * Cutting a clause proof down to what its contradiction needs. Backwards from the empty clause, each clause that is
 * needed is derived again by unit propagation from those before it, and what that used is needed too (Goldberg & Novikov
 * 2003).
 */

import type { Meter } from "../logic/meter.ts";
import type { GroundForm } from "../logic/records/ground-form.ts";

/** In {@link Trimming}, the reason of an assumption. */
const NO_CLAUSE = -1;

/**
 * The clauses of a proof that are needed, in order; the last is the empty one.
 * @param derived each follows by unit propagation from the form and those before it, and so does the empty clause
 * @param meter pays a thousandth of a step for each assignment and clause looked at
 * @throws WorkEnded
 * @throws Error when a clause does not follow, which is a bug of whoever derived it
 */
export function trimProof(
  form: GroundForm,
  derived: readonly (readonly number[])[],
  meter: Meter,
): readonly (readonly number[])[] {
  if (form.clauses.some((clause) => clause.length === 0)) return [[]];
  const given = form.clauses.length;
  const trimming = new Trimming(form.variables, [...form.clauses, ...derived], meter);
  trimming.derive([], given + derived.length);
  const kept: (readonly number[])[] = [[]];
  for (let index = derived.length - 1; index >= 0; index -= 1) {
    const clause = derived[index]!;
    if (!trimming.isNeeded(given + index) || clause.length === 0) continue;
    trimming.derive(clause, given + index);
    kept.push(clause);
  }
  return kept.reverse();
}

/** Unit propagation over the first so many of some clauses, ever fewer, with the clauses that it used. */
class Trimming {
  readonly #meter: Meter;
  /** Literals packed: 2v for v and 2v + 1 for −v. The first two of a clause are watched. */
  readonly #clauses: readonly number[][];
  /** By clause: whether a contradiction was derived from it. */
  readonly #needed: Uint8Array;
  /** Clauses of one literal, ascending. */
  readonly #units: number[] = [];
  /** By literal: the clauses that watch it. */
  readonly #watching: number[][];
  /** By literal: 1 true, −1 false, 0 neither. */
  readonly #values: Int8Array;
  /** By variable: the clause that made it what it is. */
  readonly #reasons: Int32Array;
  readonly #seen: Uint8Array;
  readonly #trail: number[] = [];

  constructor(variables: number, clauses: readonly (readonly number[])[], meter: Meter) {
    this.#meter = meter;
    this.#clauses = clauses.map((clause) =>
      clause.map((signed) => (signed > 0 ? signed * 2 : 1 - signed * 2)),
    );
    this.#needed = new Uint8Array(clauses.length);
    this.#watching = Array.from({ length: variables * 2 + 2 }, () => []);
    this.#values = new Int8Array(variables * 2 + 2);
    this.#reasons = new Int32Array(variables + 1);
    this.#seen = new Uint8Array(variables + 1);
    for (const [index, clause] of this.#clauses.entries()) {
      if (clause.length === 1) this.#units.push(index);
      for (const literal of clause.length === 1 ? [] : clause.slice(0, 2))
        this.#watching[literal]!.push(index);
    }
  }

  isNeeded(index: number): boolean {
    return this.#needed[index] === 1;
  }

  /** Derives a clause from the first `limit` clauses and marks those that this needs. Limits may not grow. */
  derive(clause: readonly number[], limit: number): void {
    const negated = clause.map((signed) => (signed > 0 ? signed * 2 + 1 : -signed * 2));
    let conflict = NO_CLAUSE;
    for (const literal of negated) this.#assign(literal, NO_CLAUSE);
    for (const index of this.#units) {
      if (index >= limit) break;
      const literal = this.#clauses[index]![0]!;
      if (this.#values[literal] === 0) this.#assign(literal, index);
      else if (this.#values[literal] === -1) {
        conflict = index;
        break;
      }
    }
    if (conflict === NO_CLAUSE) conflict = this.#propagate(limit);
    if (conflict === NO_CLAUSE) throw new Error("a derived clause does not follow by unit propagation");
    this.#mark(conflict);
    for (const literal of this.#trail) this.#values[literal] = this.#values[literal ^ 1] = 0;
    this.#trail.length = 0;
  }

  #assign(literal: number, reason: number): void {
    this.#values[literal] = 1;
    this.#values[literal ^ 1] = -1;
    this.#reasons[literal >> 1] = reason;
    this.#trail.push(literal);
  }

  /** A clause of which all literals have become false. */
  #propagate(limit: number): number {
    const values = this.#values;
    for (let done = 0; done < this.#trail.length; done += 1) {
      const falsified = this.#trail[done]! ^ 1;
      const watching = this.#watching[falsified]!;
      this.#meter.charge(1 + watching.length);
      let kept = 0;
      for (let place = 0; place < watching.length; place += 1) {
        const index = watching[place]!;
        // Limits do not grow: such a clause is never looked at again.
        if (index >= limit) continue;
        const clause = this.#clauses[index]!;
        if (clause[0] === falsified) {
          clause[0] = clause[1]!;
          clause[1] = falsified;
        }
        const first = clause[0]!;
        let other = 2;
        if (values[first] !== 1) while (other < clause.length && values[clause[other]!] === -1) other += 1;
        if (values[first] !== 1 && other < clause.length) {
          clause[1] = clause[other]!;
          clause[other] = falsified;
          this.#watching[clause[1]]!.push(index);
          continue;
        }
        watching[kept++] = index;
        if (values[first] === 1) continue;
        if (values[first] === -1) {
          watching.splice(kept, place + 1 - kept);
          return index;
        }
        this.#assign(first, index);
      }
      watching.length = kept;
    }
    return NO_CLAUSE;
  }

  /** Marks the clauses that made all literals of one false. */
  #mark(conflict: number): void {
    const note = (index: number) => {
      this.#needed[index] = 1;
      for (const literal of this.#clauses[index]!) this.#seen[literal >> 1] = 1;
    };
    note(conflict);
    for (const literal of this.#trail.toReversed()) {
      const variable = literal >> 1;
      const reason = this.#reasons[variable]!;
      if (this.#seen[variable] === 1 && reason !== NO_CLAUSE) note(reason);
      this.#seen[variable] = 0;
    }
  }
}
