/** What simplifies a clause at once: elimination of x ≠ t, rewriting, unit clauses. */
import { type Draft, type DraftState, RECORD_WORDS, Rule } from "./draft.ts";
import { atomOf, isNegative } from "./ordering.ts";
import type { RewriteIndex } from "./rewriting.ts";
import { HEADER, IDENTITY, indexOf, type TermBank } from "./terms.ts";
import type { UnitIndex } from "./units.ts";
import type { WorkClock } from "./work-clock.ts";

/** A clause is not simplified further when its record has this many words. */
const LONGEST_RECORD = 4_000;

export class Simplifier {
  readonly #bank: TermBank;
  readonly #draft: Draft;
  readonly #units: UnitIndex;
  readonly #rewriting: RewriteIndex;
  readonly #clock: WorkClock;

  constructor(bank: TermBank, draft: Draft, units: UnitIndex, rewriting: RewriteIndex, clock: WorkClock) {
    this.#bank = bank;
    this.#draft = draft;
    this.#units = units;
    this.#rewriting = rewriting;
    this.#clock = clock;
  }

  /**
   * Simplifies the draft as far as it goes; `true` also when a unit clause subsumes it.
   * @param self the clause that the draft is a copy of, which must not be used on it; -1 if there is none
   */
  simplify(state: DraftState, self: number): DraftState {
    let now = state;
    while (now === "clause" && this.#draft.recordLength < LONGEST_RECORD) {
      this.#clock.tick(4 * this.#draft.length);
      const next = this.#step(self);
      if (next === null) break;
      now = next;
    }
    return now === "clause" && this.#isSubsumed(self) ? "true" : now;
  }

  #step(self: number): DraftState | null {
    const draft = this.#draft;
    for (let k = 0; k < draft.length; k += 1)
      if (this.#canEliminate(draft.literals[k]!)) return draft.eliminate(k);
    const rewriting = this.#rewriting;
    if (!rewriting.isEmpty)
      for (let k = 0; k < draft.length; k += 1)
        if (rewriting.find(draft.literals[k]!, self))
          return draft.rewrite(k, rewriting.place, rewriting.unit, rewriting.side, rewriting.term);
    for (let k = 0; k < draft.length; k += 1) {
      const literal = draft.literals[k]!;
      const unit = this.#units.findGeneral(atomOf(literal), !isNegative(literal), self);
      if (unit >= 0) return draft.cut(k, unit, this.#units.exchanged);
    }
    return null;
  }

  #canEliminate(literal: number): boolean {
    const atom = atomOf(literal);
    const { words } = this.#bank;
    if (!isNegative(literal) || words[atom] !== IDENTITY) return false;
    const s = words[atom + HEADER]!;
    const t = words[atom + HEADER + 1]!;
    return (s < 0 && !this.#bank.occurs(indexOf(s), t)) || (t < 0 && !this.#bank.occurs(indexOf(t), s));
  }

  #isSubsumed(self: number): boolean {
    const draft = this.#draft;
    for (let k = 0; k < draft.length; k += 1) {
      const literal = draft.literals[k]!;
      const unit = this.#units.findGeneral(atomOf(literal), isNegative(literal), self);
      if (unit >= 0) return true;
    }
    return false;
  }
}

/** The clauses that a record uses. */
export function parentsOf(record: Int32Array): number[] {
  const parents: number[] = [];
  for (let k = 0; k < record.length; k += RECORD_WORDS[record[k]!]!) {
    switch (record[k]) {
      case Rule.copy:
      case Rule.factor:
      case Rule.reflect:
      case Rule.equate:
        parents.push(record[k + 1]!);
        break;
      case Rule.resolve:
        parents.push(record[k + 1]!, record[k + 3]!);
        break;
      case Rule.superpose:
        parents.push(record[k + 1]!, record[k + 4]!);
        break;
      case Rule.rewrite:
        parents.push(record[k + 3]!);
        break;
      case Rule.cut:
        parents.push(record[k + 2]!);
        break;
    }
  }
  return parents;
}
