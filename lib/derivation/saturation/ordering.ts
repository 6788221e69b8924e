/** Orderings of terms and literals that are stable under substitution: they say which inferences are not needed. */
import { HEADER, IDENTITY, indexOf, SHIFT, type TermBank } from "./terms.ts";

type Comparison = "greater" | "less" | "equal" | "incomparable";

/** A literal: twice its atom, plus one if it is negative. */
export function atomOf(literal: number): number {
  return literal >> 1;
}
export function isNegative(literal: number): boolean {
  return (literal & 1) === 1;
}
export function literalOf(atom: number, negative: boolean): number {
  return atom * 2 + (negative ? 1 : 0);
}

/** Terms whose depths come to less are compared anew each time. */
const REMEMBERED_DEPTH = 6;
/** Terms of a bank are numbered below this. */
const PAIR = 2 ** 26;
/** Comparisons that are remembered at most. */
const MOST_KNOWN = 100_000;

export class Ordering {
  readonly #bank: TermBank;
  /** By symbol. */
  readonly #precedence: readonly number[];
  readonly #byWeight: boolean;
  /** By variable: occurrences on the left less those on the right. */
  readonly #balance = new Int32Array(4 * SHIFT);
  /** By left · {@link PAIR} + right, for the path ordering: whether the left term is greater. */
  readonly #known = new Map<number, boolean>();

  /**
   * @param precedence by symbol, all different
   * @param byWeight true for the ordering of Knuth & Bendix 1970 in which each symbol weighs 1, false for the
   * lexicographic path ordering (Kamin & Lévy 1980)
   */
  constructor(bank: TermBank, precedence: readonly number[], byWeight: boolean) {
    this.#bank = bank;
    this.#precedence = precedence;
    this.#byWeight = byWeight;
  }

  compare(left: number, right: number): Comparison {
    if (left === right) return "equal";
    if (left < 0 || right < 0) {
      if (left < 0 && right < 0) return "incomparable";
      if (left < 0) return this.#bank.occurs(indexOf(left), right) ? "less" : "incomparable";
      return this.#bank.occurs(indexOf(right), left) ? "greater" : "incomparable";
    }
    if (this.#byWeight) return this.#compareWeighed(left, right);
    if (this.#isPathGreater(left, right)) return "greater";
    return this.#isPathGreater(right, left) ? "less" : "incomparable";
  }

  /**
   * Compares literals. An equation is less than everything else, which is a reduction ordering since no atom is part
   * of a term; of two equations, s = t counts as the multiset {s, t} and s ≠ t as {s, s, t, t}.
   */
  compareLiterals(left: number, right: number): Comparison {
    const a = atomOf(left);
    const b = atomOf(right);
    const { words } = this.#bank;
    const isEquation = words[a] === IDENTITY;
    if (isEquation !== (words[b] === IDENTITY)) return isEquation ? "less" : "greater";
    if (!isEquation) {
      if (a !== b) return this.compare(a, b);
      if (left === right) return "equal";
      return isNegative(left) ? "greater" : "less";
    }
    return this.#compareMultisets(this.#sides(left), this.#sides(right));
  }

  #sides(literal: number): number[] {
    const atom = atomOf(literal);
    const s = this.#bank.words[atom + HEADER]!;
    const t = this.#bank.words[atom + HEADER + 1]!;
    return isNegative(literal) ? [s, s, t, t] : [s, t];
  }

  #compareMultisets(left: number[], right: number[]): Comparison {
    const more: number[] = [];
    const rest = [...right];
    for (const term of left) {
      const place = rest.indexOf(term);
      if (place < 0) more.push(term);
      else rest.splice(place, 1);
    }
    if (more.length === 0 && rest.length === 0) return "equal";
    if (rest.every((low) => more.some((high) => this.compare(high, low) === "greater"))) return "greater";
    if (more.every((low) => rest.some((high) => this.compare(high, low) === "greater"))) return "less";
    return "incomparable";
  }

  #compareWeighed(left: number, right: number): Comparison {
    const bank = this.#bank;
    let mayBeGreater = true;
    let mayBeLess = true;
    const variables = Math.max(bank.variables(left), bank.variables(right));
    if (variables > 0) {
      this.#count(left, 1);
      this.#count(right, -1);
      for (let v = 0; v < variables; v += 1) {
        if (this.#balance[v]! > 0) mayBeLess = false;
        else if (this.#balance[v]! < 0) mayBeGreater = false;
        this.#balance[v] = 0;
      }
      if (!mayBeGreater && !mayBeLess) return "incomparable";
    }
    const result = this.#compareBalanced(left, right);
    if (result === "greater") return mayBeGreater ? result : "incomparable";
    if (result === "less") return mayBeLess ? result : "incomparable";
    return result;
  }

  #compareBalanced(left: number, right: number): Comparison {
    const bank = this.#bank;
    const more = bank.weight(left) - bank.weight(right);
    if (more !== 0) return more > 0 ? "greater" : "less";
    const a = bank.words[left]!;
    const b = bank.words[right]!;
    if (a !== b) return this.#precedence[a]! > this.#precedence[b]! ? "greater" : "less";
    for (let k = 0; k < bank.arities[a]!; k += 1) {
      const result = this.compare(bank.words[left + HEADER + k]!, bank.words[right + HEADER + k]!);
      if (result !== "equal") return result;
    }
    return "equal";
  }

  #count(term: number, by: number): void {
    if (term < 0) {
      this.#balance[-1 - term]! += by;
      return;
    }
    if (this.#bank.isGround(term)) return;
    const end = term + HEADER + this.#bank.arities[this.#bank.words[term]!]!;
    for (let k = term + HEADER; k < end; k += 1) this.#count(this.#bank.words[k]!, by);
  }

  #isPathGreater(left: number, right: number): boolean {
    if (left < 0 || left === right) return false;
    const bank = this.#bank;
    if (right < 0) return bank.occurs(indexOf(right), left);
    if (bank.depth(left) + bank.depth(right) < REMEMBERED_DEPTH) return this.#isCompoundGreater(left, right);
    // Of deep terms the same parts are compared again and again, as often as there are ways to them.
    const key = left * PAIR + right;
    let known = this.#known.get(key);
    if (known === undefined) {
      known = this.#isCompoundGreater(left, right);
      if (this.#known.size >= MOST_KNOWN) this.#known.clear();
      this.#known.set(key, known);
    }
    return known;
  }

  #isCompoundGreater(left: number, right: number): boolean {
    const bank = this.#bank;
    const a = bank.words[left]!;
    const b = bank.words[right]!;
    for (let k = 0; k < bank.arities[a]!; k += 1) {
      const arg = bank.words[left + HEADER + k]!;
      if (arg === right || this.#isPathGreater(arg, right)) return true;
    }
    if (this.#precedence[a]! < this.#precedence[b]!) return false;
    let decided = a !== b;
    for (let k = 0; k < bank.arities[b]!; k += 1) {
      const arg = bank.words[right + HEADER + k]!;
      if (!decided) {
        const own = bank.words[left + HEADER + k]!;
        if (own === arg) continue;
        if (!this.#isPathGreater(own, arg)) return false;
        decided = true;
      } else if (!this.#isPathGreater(left, arg)) return false;
    }
    return decided;
  }
}

/** An order of literals that depends little on names of variables, the heaviest first. */
export function comesBefore(bank: TermBank, left: number, right: number): boolean {
  const { words } = bank;
  const a = atomOf(left);
  const b = atomOf(right);
  const more = bank.weight(a) - bank.weight(b);
  if (more !== 0) return more > 0;
  if (words[a] !== words[b]) return words[a]! < words[b]!;
  if (isNegative(left) !== isNegative(right)) return isNegative(left);
  for (let k = 0; k < bank.arities[words[a]!]!; k += 1) {
    const s = words[a + HEADER + k]!;
    const t = words[b + HEADER + k]!;
    const first = s < 0 ? 0x7fffffff : words[s]!;
    const second = t < 0 ? 0x7fffffff : words[t]!;
    if (first !== second) return first < second;
  }
  return false;
}
