/**
 * The unit clauses kept, which have one literal and perhaps names (`splitting.ts`): which of them generalises an atom, or can be unified
 * with it.
 */
import { type ClauseStore, DELETED, HIDDEN } from "./clauses.ts";
import { filterOf, maskOf } from "./filters.ts";
import { NumberList } from "./lists.ts";
import { atomOf, isNegative } from "./ordering.ts";
import { PatternTree } from "./pattern-tree.ts";
import type { Substitution } from "./substitution.ts";
import { IDENTITY, type TermBank } from "./terms.ts";

export class UnitIndex {
  readonly #bank: TermBank;
  readonly #store: ClauseStore;
  readonly #substitution: Substitution;
  /** By literal head (twice the relation, plus one if negative): records of clause, atom, filter, its mask. */
  readonly #lists: NumberList[] = [];
  /** Positive and negative atoms. */
  readonly #trees: readonly PatternTree[];
  /** Whether the last unit found fits with the sides of its equation exchanged. */
  exchanged = false;

  constructor(bank: TermBank, store: ClauseStore, substitution: Substitution) {
    this.#bank = bank;
    this.#store = store;
    this.#substitution = substitution;
    this.#trees = [new PatternTree(bank), new PatternTree(bank)];
  }

  /** Nodes of its trees. */
  get size(): number {
    return this.#trees[0]!.size + this.#trees[1]!.size;
  }

  #list(head: number): NumberList {
    while (this.#lists.length <= head) this.#lists.push(new NumberList());
    return this.#lists[head]!;
  }

  add(clause: number): void {
    const literal = this.#store.literal(clause, 0);
    const atom = atomOf(literal);
    const list = this.#list(this.#bank.words[atom]! * 2 + (isNegative(literal) ? 1 : 0));
    const filter = filterOf(this.#bank, atom);
    list.push4(clause, atom, filter, maskOf(filter));
    list.retain4((unit) => !this.#store.is(unit, DELETED));
    this.#trees[isNegative(literal) ? 1 : 0]!.add(atom, clause);
  }

  /**
   * A unit clause, not `self`, of a sign of which the atom is an instance; -1 if there is none.
   * @param allows whether one that has names may be used
   */
  findGeneral(atom: number, negative: boolean, self: number, allows: (unit: number) => boolean): number {
    const tree = this.#trees[negative ? 1 : 0]!;
    this.exchanged = false;
    if (tree.isEmpty) return -1;
    this.#self = self;
    this.#allows = allows;
    const found = tree.find(atom, this.#isUsable);
    if (found >= 0 || this.#bank.words[atom] !== IDENTITY) return found;
    this.exchanged = true;
    return tree.findExchanged(atom, this.#isUsable);
  }
  #self = -1;
  #allows: (unit: number) => boolean = allowsAll;
  readonly #isUsable = (unit: number) =>
    unit !== this.#self &&
    !this.#store.is(unit, HIDDEN) &&
    (this.#store.length(unit) === 1 || this.#allows(unit));

  /** A unit clause of a sign whose atom can be unified with a shifted atom; -1 if there is none. No bindings are left. */
  findUnifiable(atom: number, negative: boolean): number {
    if (this.#bank.isGround(atom)) return this.findGeneral(atom, negative, -1, allowsAll);
    const head = this.#bank.words[atom]! * 2 + (negative ? 1 : 0);
    if (head >= this.#lists.length) return -1;
    const list = this.#lists[head]!;
    const { values } = list;
    const filter = filterOf(this.#bank, atom);
    const mask = maskOf(filter);
    for (let k = 0; k < list.length; k += 4) {
      if (((filter ^ values[k + 2]!) & mask & values[k + 3]!) !== 0) continue;
      if (this.#store.is(values[k]!, HIDDEN)) continue;
      const mark = this.#substitution.mark;
      const fits = this.#substitution.unify(atom, values[k + 1]!);
      this.#substitution.undo(mark);
      if (fits) return values[k]!;
    }
    return -1;
  }
}

/** Allows every unit clause. */
export const allowsAll = () => true;
