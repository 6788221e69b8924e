/** What simplifies a clause at once: elimination of x ≠ t, rewriting, unit clauses. */
import type { ClauseStore } from "./clauses.ts";
import { type Draft, type DraftState, RECORD_WORDS, Rule } from "./draft.ts";
import { atomOf, isNegative } from "./ordering.ts";
import type { RewriteIndex } from "./rewriting.ts";
import { HEADER, IDENTITY, indexOf, type TermBank } from "./terms.ts";
import { allowsAll, type UnitIndex } from "./units.ts";
import type { WorkClock } from "./work-clock.ts";

/** A clause is not simplified further when its record has this many words. */
const LONGEST_RECORD = 4_000;

export class Simplifier {
  readonly #bank: TermBank;
  readonly #store: ClauseStore;
  readonly #draft: Draft;
  readonly #units: UnitIndex;
  readonly #rewriting: RewriteIndex;
  readonly #clock: WorkClock;

  constructor(
    bank: TermBank,
    store: ClauseStore,
    draft: Draft,
    units: UnitIndex,
    rewriting: RewriteIndex,
    clock: WorkClock,
  ) {
    this.#bank = bank;
    this.#store = store;
    this.#draft = draft;
    this.#units = units;
    this.#rewriting = rewriting;
    this.#clock = clock;
  }

  /**
   * Simplifies the draft as far as it goes; `true` also when a unit clause subsumes it.
   * @param self the clause that the draft is a copy of, which must not be used on it; -1 if there is none
   * @param inModel whether also by unit clauses that have other names than the draft, so that what it becomes may do for
   *   it just in the present model of the names: it gets those names
   */
  simplify(state: DraftState, self: number, inModel = false): DraftState {
    this.#allows = inModel ? allowsAll : this.#hasNamesOf;
    this.subsuming = -1;
    let now = state;
    while (now === "clause" && this.#draft.recordLength < LONGEST_RECORD) {
      this.#clock.tick(4 * this.#draft.length);
      const next = this.#step(self);
      if (next === null) break;
      now = next;
    }
    if (now === "clause") this.subsuming = this.#findSubsuming(self);
    return this.subsuming >= 0 ? "true" : now;
  }

  /** The unit clause by which the draft became `true` at last; -1 where that was not the reason. */
  subsuming = -1;
  #allows: (unit: number) => boolean = allowsAll;

  /** Whether the draft has all names of a unit clause. */
  readonly #hasNamesOf = (unit: number): boolean => {
    const { literals, length } = this.#draft;
    for (let k = 1; k < this.#store.length(unit); k += 1) {
      const place = literals.indexOf(this.#store.literal(unit, k));
      if (place < 0 || place >= length) return false;
    }
    return true;
  };

  #step(self: number): DraftState | null {
    const draft = this.#draft;
    for (let k = 0; k < draft.length; k += 1)
      if (this.#canEliminate(draft.literals[k]!)) return draft.eliminate(k);
    const rewriting = this.#rewriting;
    if (!rewriting.isEmpty)
      for (let k = 0; k < draft.length; k += 1)
        if (rewriting.find(draft.literals[k]!, self, this.#allows))
          return draft.rewrite(k, rewriting.place, rewriting.unit, rewriting.side, rewriting.term);
    for (let k = 0; k < draft.length; k += 1) {
      const literal = draft.literals[k]!;
      const unit = this.#units.findGeneral(atomOf(literal), !isNegative(literal), self, this.#allows);
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

  #findSubsuming(self: number): number {
    const draft = this.#draft;
    for (let k = 0; k < draft.length; k += 1) {
      const literal = draft.literals[k]!;
      const unit = this.#units.findGeneral(atomOf(literal), isNegative(literal), self, this.#allows);
      if (unit >= 0) return unit;
    }
    return -1;
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
