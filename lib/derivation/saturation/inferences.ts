/**
 * The inferences between one clause and all active ones: ordered resolution with selection and factoring, superposition,
 * equality resolution and factoring (Bachmair & Ganzinger 1994).
 */
import { type ClauseStore, DELETED, HIDDEN } from "./clauses.ts";
import type { Draft, DraftState } from "./draft.ts";
import { filterOf, maskOf } from "./filters.ts";
import { NumberList } from "./lists.ts";
import { atomOf, isNegative, type Ordering } from "./ordering.ts";
import type { Substitution } from "./substitution.ts";
import { HEADER, IDENTITY, type TermBank } from "./terms.ts";
import type { WorkClock } from "./work-clock.ts";

/** Where a variable as side of an equation stands in place of a head. */
const VARIABLE_HEAD = 0;

export class Inferences {
  readonly #bank: TermBank;
  readonly #store: ClauseStore;
  readonly #draft: Draft;
  readonly #ordering: Ordering;
  readonly #substitution: Substitution;
  readonly #clock: WorkClock;
  /** By literal head (twice the relation, plus one if negative): records of clause, literal, filter, its mask. */
  readonly #literals: NumberList[] = [];
  /** By head of a side of a positive equation: records of clause, literal, side, 1 if it is the greater one. */
  readonly #sides: NumberList[] = [];
  /** By head of a subterm: records of clause, literal, place, subterm. */
  readonly #subterms: NumberList[] = [];
  readonly #conclude: (state: DraftState) => void;

  /** @param conclude called with the draft as each conclusion; the substitution may be used meanwhile */
  constructor(
    bank: TermBank,
    store: ClauseStore,
    draft: Draft,
    ordering: Ordering,
    substitution: Substitution,
    clock: WorkClock,
    conclude: (state: DraftState) => void,
  ) {
    this.#bank = bank;
    this.#store = store;
    this.#draft = draft;
    this.#ordering = ordering;
    this.#substitution = substitution;
    this.#clock = clock;
    this.#conclude = conclude;
  }

  /** How many active literals a literal may be resolved with. */
  partnersOf(literal: number): number {
    const atom = atomOf(literal);
    const list = this.#literals[this.#bank.words[atom]! * 2 + (isNegative(literal) ? 0 : 1)];
    return list === undefined ? 0 : list.length / 4;
  }

  /** Makes a clause active by some of its literals. */
  add(clause: number, eligible: readonly number[], hasEquality: boolean): void {
    const { words } = this.#bank;
    for (const place of eligible) {
      const literal = this.#store.literal(clause, place);
      const atom = atomOf(literal);
      const symbol = words[atom]!;
      if (symbol !== IDENTITY) {
        const head = symbol * 2 + (isNegative(literal) ? 1 : 0);
        const filter = filterOf(this.#bank, atom);
        this.#push(this.#literals, head, clause, place, filter, maskOf(filter));
      }
      if (!hasEquality) continue;
      if (symbol === IDENTITY && !isNegative(literal))
        this.#forSides(atom, (side, isGreater) => {
          const from = words[atom + HEADER + side]!;
          const head = from < 0 ? VARIABLE_HEAD : words[from]!;
          this.#push(this.#sides, head, clause, place, side, isGreater ? 1 : 0);
        });
      this.#forSubterms(atom, (place2, term) =>
        this.#push(this.#subterms, words[term]!, clause, place, place2, term),
      );
    }
  }

  #push(lists: NumberList[], head: number, a: number, b: number, c: number, d: number): void {
    while (lists.length <= head) lists.push(new NumberList());
    const list = lists[head]!;
    list.push4(a, b, c, d);
    list.retain4((clause) => !this.#store.is(clause, DELETED));
  }

  /** The sides of an equation that are not less than the other one. */
  #forSides(atom: number, act: (side: number, isGreater: boolean) => void): void {
    const compared = this.#compareSides(atom);
    if (compared !== "less") act(0, compared === "greater");
    if (compared !== "greater") act(1, compared === "less");
  }

  #compareSides(atom: number) {
    return this.#ordering.compare(this.#bank.words[atom + HEADER]!, this.#bank.words[atom + HEADER + 1]!);
  }

  /** Subterms that are no variables, with their places; of equations not those of a lesser side. */
  #forSubterms(atom: number, act: (place: number, term: number) => void): void {
    const { words, arities } = this.#bank;
    const isEquation = words[atom] === IDENTITY;
    const compared = isEquation ? this.#compareSides(atom) : "incomparable";
    let count = 0;
    const visit = (term: number, isLesser: boolean): void => {
      count += 1;
      if (term < 0) return;
      if (!isLesser) act(count, term);
      for (let k = 0; k < arities[words[term]!]!; k += 1) visit(words[term + HEADER + k]!, isLesser);
    };
    for (let k = 0; k < arities[words[atom]!]!; k += 1)
      visit(words[atom + HEADER + k]!, isEquation && compared === (k === 0 ? "less" : "greater"));
  }

  /** All conclusions from a clause that is active by now, with itself and the other active ones. */
  infer(clause: number, eligible: readonly number[], hasEquality: boolean): void {
    this.#draft.setGiven(clause);
    for (const place of eligible) {
      const literal = this.#store.literal(clause, place);
      const isEquation = this.#bank.words[atomOf(literal)] === IDENTITY;
      if (isEquation && isNegative(literal)) this.#reflect(clause, place);
      if (!isNegative(literal)) {
        if (isEquation) this.#equate(clause, place);
        else this.#factor(clause, place);
      }
    }
    for (const place of eligible) {
      const literal = this.#draft.given[place]!;
      const isEquation = this.#bank.words[atomOf(literal)] === IDENTITY;
      if (!isEquation) this.#resolve(clause, place, literal);
      if (!hasEquality) continue;
      if (isEquation && !isNegative(literal)) this.#rewriteOthers(clause, place, atomOf(literal));
      this.#rewriteIn(clause, place, atomOf(literal));
    }
  }

  #resolve(clause: number, place: number, literal: number): void {
    const atom = atomOf(literal);
    const list = this.#literals[this.#bank.words[atom]! * 2 + (isNegative(literal) ? 0 : 1)];
    if (list === undefined) return;
    const filter = filterOf(this.#bank, atom);
    const mask = maskOf(filter);
    this.#clock.tick(list.length >> 4);
    for (let k = 0; k < list.length; k += 4) {
      if (((list.values[k + 2]! ^ filter) & list.values[k + 3]! & mask) !== 0) continue;
      const other = list.values[k]!;
      if (this.#store.is(other, HIDDEN)) continue;
      const its = list.values[k + 1]!;
      this.#clock.tick(1);
      if (this.#substitution.unify(atom, atomOf(this.#store.literal(other, its))))
        this.#conclusion(this.#draft.resolve(clause, place, other, its));
      this.#substitution.undo(0);
    }
  }

  #conclusion(state: DraftState): void {
    this.#substitution.undo(0);
    this.#conclude(state);
  }

  #factor(clause: number, place: number): void {
    const literal = this.#store.literal(clause, place);
    for (let k = 0; k < this.#store.length(clause); k += 1) {
      const other = this.#store.literal(clause, k);
      if (
        k === place ||
        isNegative(other) ||
        this.#bank.words[atomOf(other)] !== this.#bank.words[atomOf(literal)]
      )
        continue;
      if (this.#substitution.unify(atomOf(literal), atomOf(other)))
        this.#conclusion(this.#draft.factor(clause, place, k));
      this.#substitution.undo(0);
    }
  }

  #reflect(clause: number, place: number): void {
    const atom = atomOf(this.#store.literal(clause, place));
    const { words } = this.#bank;
    if (this.#substitution.unify(words[atom + HEADER]!, words[atom + HEADER + 1]!))
      this.#conclusion(this.#draft.reflect(clause, place));
    this.#substitution.undo(0);
  }

  #equate(clause: number, place: number): void {
    const atom = atomOf(this.#store.literal(clause, place));
    for (let k = 0; k < this.#store.length(clause); k += 1) {
      const other = this.#store.literal(clause, k);
      if (k === place || isNegative(other) || this.#bank.words[atomOf(other)] !== IDENTITY) continue;
      this.#forSides(atom, (side) => {
        for (let its = 0; its < 2; its += 1) {
          const { words } = this.#bank;
          if (this.#substitution.unify(words[atom + HEADER + side]!, words[atomOf(other) + HEADER + its]!))
            this.#conclusion(this.#draft.equate(clause, place, side, k, its));
          this.#substitution.undo(0);
        }
      });
    }
  }

  /** Superposition with an equation of the given clause. */
  #rewriteOthers(clause: number, place: number, atom: number): void {
    this.#forSides(atom, (side, isGreater) => {
      const from = this.#bank.words[atom + HEADER + side]!;
      const first = from < 0 ? 0 : this.#bank.words[from]!;
      const last = from < 0 ? this.#subterms.length - 1 : first;
      for (let head = first; head <= last; head += 1) {
        const list = this.#subterms[head];
        if (list === undefined) continue;
        for (let k = 0; k < list.length; k += 4) {
          const other = list.values[k]!;
          if (this.#store.is(other, HIDDEN)) continue;
          this.#clock.tick(1);
          if (
            this.#substitution.unify(from, list.values[k + 3]!) &&
            (isGreater || this.#isNotLess(from, this.#bank.words[atom + HEADER + 1 - side]!))
          ) {
            const its = list.values[k + 1]!;
            this.#conclusion(
              this.#draft.superpose(clause, place, side, other, its, list.values[k + 2]!, true),
            );
          }
          this.#substitution.undo(0);
        }
      }
    });
  }

  /** Superposition with equations of active clauses into a literal of the given one. */
  #rewriteIn(clause: number, place: number, atom: number): void {
    this.#forSubterms(atom, (where, term) => {
      for (const head of [VARIABLE_HEAD, this.#bank.words[term]!]) {
        const list = this.#sides[head];
        if (list === undefined) continue;
        for (let k = 0; k < list.length; k += 4) {
          const other = list.values[k]!;
          if (this.#store.is(other, HIDDEN)) continue;
          // With itself, a clause meets its own equations in the other role already.
          if (other === clause) continue;
          this.#clock.tick(1);
          const its = list.values[k + 1]!;
          const side = list.values[k + 2]!;
          const equation = atomOf(this.#store.literal(other, its));
          const from = this.#bank.words[equation + HEADER + side]!;
          if (
            this.#substitution.unify(term, from) &&
            (list.values[k + 3] === 1 ||
              this.#isNotLess(from, this.#bank.words[equation + HEADER + 1 - side]!))
          )
            this.#conclusion(this.#draft.superpose(other, its, side, clause, place, where, false));
          this.#substitution.undo(0);
        }
      }
    });
  }

  /** Whether, with the present bindings, one term is not less than another or equal to it. */
  #isNotLess(left: number, right: number): boolean {
    this.#substitution.beginInstance();
    const a = this.#substitution.instance(left);
    const b = this.#substitution.instance(right);
    if (a === 0 || b === 0) return false;
    const compared = this.#ordering.compare(a, b);
    return compared !== "less" && compared !== "equal";
  }

  /** Calls back for each active clause in which a term that an equation makes less may occur. */
  forRewritable(side: number, act: (clause: number) => void): void {
    const list = side < 0 ? undefined : this.#subterms[this.#bank.words[side]!];
    if (list === undefined) return;
    for (let k = 0; k < list.length; k += 4) {
      const clause = list.values[k]!;
      if (this.#store.is(clause, HIDDEN)) continue;
      this.#clock.tick(1);
      const fits = this.#substitution.match(side, list.values[k + 3]!);
      this.#substitution.undo(0);
      if (fits) act(clause);
    }
  }
}
