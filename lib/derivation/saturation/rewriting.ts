/** Rewriting with unit equations (Knuth & Bendix 1970), also with those that only some instances orient. */
import { type ClauseStore, HIDDEN } from "./clauses.ts";
import { atomOf, isNegative, type Ordering } from "./ordering.ts";
import { PatternTree } from "./pattern-tree.ts";
import type { Substitution } from "./substitution.ts";
import { HEADER, IDENTITY, indexOf, type TermBank } from "./terms.ts";
import { allowsAll } from "./units.ts";

/** Entries of the table of terms known to have nothing to rewrite at their head. */
const KNOWN = 1 << 12;

export class RewriteIndex {
  readonly #bank: TermBank;
  readonly #store: ClauseStore;
  readonly #ordering: Ordering;
  readonly #substitution: Substitution;
  /** Sides that are rewritten, with 4 · clause + 2 · side, plus 1 if every instance is oriented. */
  readonly #tree: PatternTree;
  readonly #heads: boolean[] = [];
  /** Terms whose head was found irreducible; forgotten with every new equation. */
  #known = new Int32Array(KNOWN);

  /** What the last rewriting found: the place in the atom, the equation and the side that fits, the new term. */
  place = 0;
  unit = -1;
  side = 0;
  term = 0;
  #count = 0;
  #allows: (unit: number) => boolean = allowsAll;

  constructor(bank: TermBank, store: ClauseStore, ordering: Ordering, substitution: Substitution) {
    this.#bank = bank;
    this.#store = store;
    this.#ordering = ordering;
    this.#substitution = substitution;
    this.#tree = new PatternTree(bank);
  }

  /** Nodes of its tree. */
  get size(): number {
    return this.#tree.size;
  }

  get isEmpty(): boolean {
    return this.#tree.isEmpty;
  }

  /** Forgets which terms are irreducible: equations take part that did not. */
  forget(): void {
    this.#known.fill(0);
  }

  /** Adds a positive unit equation. */
  add(clause: number): void {
    const atom = atomOf(this.#store.literal(clause, 0));
    const { words } = this.#bank;
    const compared = this.#ordering.compare(words[atom + HEADER]!, words[atom + HEADER + 1]!);
    for (let side = 0; side < 2; side += 1) {
      if (compared === (side === 0 ? "less" : "greater")) continue;
      const from = words[atom + HEADER + side]!;
      if (from < 0 || !this.#hasVariablesOf(from, words[atom + HEADER + 1 - side]!)) continue;
      this.#heads[words[from]!] = true;
      this.#tree.add(from, 4 * clause + 2 * side + (compared === "incomparable" ? 0 : 1));
      this.forget();
    }
  }

  #hasVariablesOf(term: number, other: number): boolean {
    if (other < 0) return this.#bank.occurs(indexOf(other), term);
    if (this.#bank.isGround(other)) return true;
    const { words } = this.#bank;
    const end = other + HEADER + this.#bank.arities[words[other]!]!;
    for (let k = other + HEADER; k < end; k += 1) if (!this.#hasVariablesOf(term, words[k]!)) return false;
    return true;
  }

  /**
   * Looks for something to rewrite in a literal, with any equation but `self`, and tells whether it found it. A side
   * of a positive equation is rewritten at its head only where that makes less than the equation: so clauses that
   * saturation needs are kept.
   * @param allows whether an equation that has names may be used
   */
  find(literal: number, self: number, allows: (unit: number) => boolean): boolean {
    this.#allows = allows;
    const atom = atomOf(literal);
    this.#count = 0;
    const { words } = this.#bank;
    const arity = this.#bank.arities[words[atom]!]!;
    const isEquation = words[atom] === IDENTITY && !isNegative(literal);
    for (let k = 0; k < arity; k += 1)
      if (this.#findIn(words[atom + HEADER + k]!, self, isEquation ? words[atom + HEADER + 1 - k]! : 0))
        return true;
    return false;
  }

  /** @param other the other side of a positive equation, 0 elsewhere */
  #findIn(term: number, self: number, other: number): boolean {
    this.#count += 1;
    if (term < 0) return false;
    const at = this.#count;
    if (this.#findAt(term, self, other)) {
      this.place = at;
      return true;
    }
    const arity = this.#bank.arities[this.#bank.words[term]!]!;
    for (let k = 0; k < arity; k += 1)
      if (this.#findIn(this.#bank.words[term + HEADER + k]!, self, 0)) return true;
    return false;
  }

  #findAt(term: number, self: number, other: number): boolean {
    if (this.#heads[this.#bank.words[term]!] !== true) return false;
    const slot = (term * 5) & (KNOWN - 1);
    if (this.#known[slot] === term) return false;
    this.#asked = term;
    this.#self = self;
    this.#other = other;
    this.#isIrreducible = true;
    if (this.#tree.find(term, this.#accept) >= 0) return true;
    if (this.#isIrreducible) this.#known[slot] = term;
    return false;
  }
  #asked = 0;
  #self = -1;
  #other = 0;
  #isIrreducible = true;

  /** Whether an equation's side of which the term asked for is an instance may be used, and what it gives. */
  readonly #accept = (value: number): boolean => {
    const unit = value >> 2;
    if (this.#store.is(unit, HIDDEN)) return false;
    const side = (value >> 1) & 1;
    const atom = atomOf(this.#store.literal(unit, 0));
    const mark = this.#substitution.mark;
    this.#substitution.match(this.#bank.words[atom + HEADER + side]!, this.#asked);
    const image = this.#substitution.image(this.#bank.words[atom + HEADER + 1 - side]!);
    this.#substitution.undo(mark);
    if ((value & 1) === 0 && this.#ordering.compare(this.#asked, image) !== "greater") return false;
    this.#isIrreducible = false;
    if (this.#store.length(unit) > 1 && !this.#allows(unit)) return false;
    if (unit === this.#self || !this.#leavesLess(this.#asked, image, this.#other)) return false;
    this.unit = unit;
    this.side = side;
    this.term = image;
    return true;
  };

  /** Whether rewriting a term at the head of a side makes less than the equation; `other` is the other side, or 0. */
  #leavesLess(term: number, image: number, other: number): boolean {
    if (other === 0 || this.#ordering.compare(other, term) === "greater") return true;
    return this.#ordering.compare(other, image) === "greater";
  }
}
