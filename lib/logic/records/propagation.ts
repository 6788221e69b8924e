/**
 * Unit propagation, which carries both the inferences of derivations and clause proofs: a clause follows by it when
 * from the assumption that all its literals are false, each clause with but one literal left makes that one true, until
 * some clause has none left (Goldberg & Novikov 2003). Two literals of each clause are watched (Moskewicz et al. 2001).
 *
 * Sound, since it makes true only what must be true where all clauses are and the assumption holds.
 */
import type { Meter } from "../meter.ts";

/** A literal as in DIMACS, v or −v for v ≥ 1, as an index: 2v or 2v + 1, so that `literal ^ 1` is its negation. */
function pack(signed: number): number {
  return signed > 0 ? signed * 2 : 1 - signed * 2;
}

export class Propagation {
  readonly #meter: Meter;
  /** By literal: 1 true, −1 false, 0 or undefined neither. */
  readonly #values: number[] = [];
  /** By literal: the clauses whose first or second literal it is. */
  readonly #watching: number[][][] = [];
  readonly #trail: number[] = [];
  /** How much of the trail has been propagated. */
  #done = 0;
  #contradictory = false;

  /** @param meter pays a thousandth of a step for each clause and assignment looked at */
  constructor(meter: Meter) {
    this.#meter = meter;
  }

  /** Adds a clause. What follows from the clauses alone stays assigned. */
  add(signed: readonly number[]): void {
    const clause = [...new Set(signed)].map(pack);
    this.#meter.charge(1 + clause.length);
    if (this.#contradictory || clause.some((literal) => this.#values[literal] === 1)) return;
    const open = clause.filter((literal) => this.#values[literal] !== -1);
    if (open.length > 1) {
      for (const literal of open.slice(0, 2)) this.#watchersOf(literal).push(open);
      return;
    }
    if (open.length === 1) this.#assign(open[0]!);
    this.#contradictory = open.length === 0 || !this.#propagate();
  }

  /** Whether a clause follows by unit propagation. */
  follows(signed: readonly number[]): boolean {
    this.#meter.charge(1 + signed.length);
    if (this.#contradictory) return true;
    const before = this.#trail.length;
    let isTrue = false;
    for (const literal of signed.map(pack)) {
      if (this.#values[literal] === 1) isTrue = true;
      else if (this.#values[literal] !== -1) this.#assign(literal ^ 1);
    }
    const follows = isTrue || !this.#propagate();
    for (const literal of this.#trail.splice(before)) this.#values[literal] = this.#values[literal ^ 1] = 0;
    this.#done = before;
    return follows;
  }

  #assign(literal: number): void {
    this.#values[literal] = 1;
    this.#values[literal ^ 1] = -1;
    this.#trail.push(literal);
  }

  #watchersOf(literal: number): number[][] {
    this.#watching[literal] ??= [];
    return this.#watching[literal]!;
  }

  /** Makes true what must be; false when a clause has no literal left that could be. */
  #propagate(): boolean {
    while (this.#done < this.#trail.length) {
      const falsified = this.#trail[this.#done++]! ^ 1;
      const clauses = this.#watchersOf(falsified);
      this.#meter.charge(1 + clauses.length);
      let kept = 0;
      for (const [place, clause] of clauses.entries()) {
        if (clause[0] === falsified) [clause[0], clause[1]] = [clause[1]!, falsified];
        const first = clause[0]!;
        const other = this.#values[first] === 1 ? -1 : this.#findOther(clause);
        if (other > 0) {
          [clause[1], clause[other]] = [clause[other]!, falsified];
          this.#watchersOf(clause[1]!).push(clause);
          continue;
        }
        clauses[kept++] = clause;
        if (this.#values[first] === 1) continue;
        if (this.#values[first] === -1) {
          // The clauses not looked at stay where they are.
          clauses.splice(kept, place + 1 - kept);
          return false;
        }
        this.#assign(first);
      }
      clauses.length = kept;
    }
    return true;
  }

  /** The place of a literal that can be watched in place of the second; −1 when there is none. */
  #findOther(clause: readonly number[]): number {
    for (let place = 2; place < clause.length; place += 1)
      if (this.#values[clause[place]!] !== -1) return place;
    return -1;
  }
}
