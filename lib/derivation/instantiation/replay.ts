/**
 * The part of a propositional refutation that matters: learned clauses are gone through from the last one back, and
 * of those that are needed unit propagation is done again to see from what they follow (Goldberg & Novikov 2003; clauses
 * known to be needed are propagated before others: Heule, Hunt & Wetzler 2013).
 */
import type { Meter } from "../../logic/meter.ts";

/** A learned clause that is needed, and what it follows from: given clauses, and earlier steps of the replay. */
export interface ReplayStep {
  readonly clause: readonly number[];
  readonly given: readonly number[];
  readonly steps: readonly number[];
}

const UNASSIGNED = 0;

/**
 * @param given clauses in signed literals, none with a literal twice or with its negation
 * @param learned in the order in which they were learned; the last one is empty
 * @returns the steps that are needed, the last one for the empty clause
 * @throws WorkEnded
 */
export function replay(
  variables: number,
  given: readonly (readonly number[])[],
  learned: readonly (readonly number[])[],
  meter: Meter,
): readonly ReplayStep[] {
  const propagation = new Propagation(variables, [...given, ...learned], meter);
  const needed = new Map<number, readonly number[]>();
  propagation.need(given.length + learned.length - 1);
  for (let place = given.length + learned.length - 1; place >= given.length; place -= 1) {
    if (!propagation.isNeeded(place)) continue;
    const reasons = propagation.reasonsFor(place);
    needed.set(place, reasons);
    for (const reason of reasons) propagation.need(reason);
  }
  const places = [...needed.keys()].reverse();
  const stepOf = new Map(places.map((place, step) => [place, step]));
  return places.map((place) => {
    const reasons = needed.get(place)!;
    return {
      clause: learned[place - given.length]!,
      given: reasons.filter((reason) => reason < given.length),
      steps: reasons.flatMap((reason) => (reason < given.length ? [] : [stepOf.get(reason)!])),
    };
  });
}

/** Unit propagation with a count of false literals for each clause. */
class Propagation {
  readonly #clauses: readonly (readonly number[])[];
  readonly #meter: Meter;
  /** By literal, see {@link slot}: the clauses that have it. */
  readonly #occurrences: number[][];
  /** By variable: 1 true, −1 false. */
  readonly #values: Int8Array;
  /** By variable that is assigned: the clause that made it so, −1 for an assumption. */
  readonly #reasons: Int32Array;
  readonly #trail: number[] = [];
  /** By clause: how many literals are counted as false. */
  readonly #falsified: Int32Array;
  readonly #needed: Uint8Array;
  readonly #units: readonly number[];
  /** Literals of the trail that needed clauses, and that the others, have been told of. */
  #toldNeeded = 0;
  #toldOthers = 0;

  constructor(variables: number, clauses: readonly (readonly number[])[], meter: Meter) {
    this.#clauses = clauses;
    this.#meter = meter;
    this.#occurrences = Array.from({ length: 2 * variables + 2 }, () => []);
    this.#values = new Int8Array(variables + 1);
    this.#reasons = new Int32Array(variables + 1);
    this.#falsified = new Int32Array(clauses.length);
    this.#needed = new Uint8Array(clauses.length);
    clauses.forEach((clause, place) => {
      for (const literal of clause) this.#occurrences[slot(literal)]!.push(place);
    });
    this.#units = clauses.flatMap((clause, place) => (clause.length === 1 ? [place] : []));
  }

  isNeeded(place: number): boolean {
    return this.#needed[place] === 1;
  }

  need(place: number): void {
    this.#needed[place] = 1;
  }

  /** The clauses before a learned one from which it follows by unit propagation, ascending. */
  reasonsFor(place: number): readonly number[] {
    for (const literal of this.#clauses[place]!) this.#assign(-literal, -1);
    const conflict = this.#propagate(place);
    if (conflict < 0) throw new Error("a learned clause does not follow by unit propagation");
    const reasons = this.#analyse(conflict);
    this.#undo();
    return reasons;
  }

  #assign(literal: number, reason: number): void {
    const variable = Math.abs(literal);
    this.#values[variable] = literal > 0 ? 1 : -1;
    this.#reasons[variable] = reason;
    this.#trail.push(literal);
  }

  #valueOf(literal: number): number {
    const value = this.#values[Math.abs(literal)]!;
    return literal > 0 ? value : -value;
  }

  /** The clause all of whose literals are false, of those before `limit`; −1 when there is none. */
  #propagate(limit: number): number {
    for (const wanted of [1, 0])
      for (const unit of this.#units) {
        if (unit >= limit || this.#needed[unit] !== wanted) continue;
        const literal = this.#clauses[unit]![0]!;
        const value = this.#valueOf(literal);
        if (value < 0) return unit;
        if (value === UNASSIGNED) this.#assign(literal, unit);
      }
    for (;;) {
      let conflict = -1;
      if (this.#toldNeeded < this.#trail.length)
        conflict = this.#tell(this.#trail[this.#toldNeeded++]!, 1, limit);
      else if (this.#toldOthers < this.#trail.length)
        conflict = this.#tell(this.#trail[this.#toldOthers++]!, 0, limit);
      else return -1;
      if (conflict >= 0) return conflict;
    }
  }

  /** Counts a literal that has become true in the clauses that have its negation. */
  #tell(literal: number, wanted: number, limit: number): number {
    const clauses = this.#occurrences[slot(-literal)]!;
    this.#meter.charge(clauses.length + 1);
    let conflict = -1;
    for (const place of clauses) {
      if (this.#needed[place] !== wanted) continue;
      const falsified = this.#falsified[place]! + 1;
      this.#falsified[place] = falsified;
      if (place >= limit || conflict >= 0) continue;
      const clause = this.#clauses[place]!;
      if (falsified < clause.length - 1) continue;
      const open = clause.find((other) => this.#valueOf(other) >= 0);
      if (open === undefined) conflict = place;
      else if (this.#valueOf(open) === UNASSIGNED) this.#assign(open, place);
    }
    return conflict;
  }

  #analyse(conflict: number): readonly number[] {
    const reasons = new Set<number>([conflict]);
    const seen = new Set<number>();
    for (const reason of reasons)
      for (const literal of this.#clauses[reason]!) {
        const variable = Math.abs(literal);
        if (seen.has(variable) || this.#values[variable] === UNASSIGNED) continue;
        seen.add(variable);
        if (this.#reasons[variable]! >= 0) reasons.add(this.#reasons[variable]!);
      }
    return [...reasons].sort((a, b) => a - b);
  }

  #undo(): void {
    this.#trail.forEach((literal, index) => {
      this.#values[Math.abs(literal)] = UNASSIGNED;
      for (const place of this.#occurrences[slot(-literal)]!) {
        const told = this.#needed[place] === 1 ? this.#toldNeeded : this.#toldOthers;
        if (index < told) this.#falsified[place]! -= 1;
      }
    });
    this.#trail.length = 0;
    this.#toldNeeded = 0;
    this.#toldOthers = 0;
  }
}

function slot(literal: number): number {
  return literal > 0 ? 2 * literal : -2 * literal + 1;
}
