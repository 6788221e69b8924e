/** Short formulas for given truth values: of a few literals if there is one, else a disjunction of short conjunctions. */
import { allOf, anyOf } from "../logic/carrier-formulas.ts";
import type { CarrierFormula } from "../logic/structure-definition.ts";

/** An atom or the negation of one. */
export interface Literal {
  readonly formula: CarrierFormula;
  /** Bit i is set where it is true of the i-th case. */
  readonly values: bigint;
  /** How long it is to read; of formulas of as many literals the one of the least cost is taken. */
  readonly cost: number;
}

/** Literals up to which conjunctions of three are looked at, and formulas of three literals. */
const FEW_LITERALS = 60;
/** Literals up to which conjunctions of two are. */
const MANY_LITERALS = 300;
/** Formulas of two literals up to this cost are taken before any of three. */
const PLAIN_COST = 32;
/** Cases up to which conjunctions are looked at before they are needed, and formulas of three literals at all. */
const FEW_CASES = 1_000;
/** Conjunctions that are chosen from, the cheapest, and that a formula has at most. */
const MOST_CHOICES = 5_000;
const MOST_CUBES = 100;

/**
 * A formula with the given truth values, the same for the same arguments. Formulas of at most three literals are tried
 * by increasing number and cost; then, for the values and for their complement, conjunctions of literals are chosen
 * greedily until they cover all cases, and the shorter disjunction (or the negation of it, as a conjunction of
 * disjunctions) is taken.
 * @param literals with each its negation
 * @param values bit i is set where the formula is to be true of the i-th case
 * @param cases how many there are
 * @returns null when it would have more than {@link MOST_CUBES} conjunctions
 * @throws Error when the literals do not tell cases apart that have different values
 */
export function shortestFormula(
  literals: readonly Literal[],
  values: bigint,
  cases: number,
): CarrierFormula | null {
  const all = (1n << BigInt(cases)) - 1n;
  if (values === 0n) return { kind: "false" };
  if (values === all) return { kind: "true" };
  const distinct = distinctLiterals(literals, all);
  const few = shortOf(distinct, values, all, cases);
  if (few !== null) return few.formula;
  const negated = new Map(distinct.map((literal) => [literal.values, literal]));
  const cubes = cover(distinct, values, all, cases);
  const disjunction = cubes === null ? null : formulaOf(cubes, false);
  const others = cover(distinct, all ^ values, all, cases);
  if (others === null) return disjunction?.formula ?? null;
  const turned = others.map((cube) => cube.map(({ values: own }) => negated.get(all ^ own)!));
  const conjunction = formulaOf(turned, true);
  return disjunction === null || conjunction.cost < disjunction.cost
    ? conjunction.formula
    : disjunction.formula;
}

interface Candidate {
  readonly formula: CarrierFormula;
  readonly cost: number;
}

/** Of literals with the same values the cheapest, first come first; none that is always true or always false. */
function distinctLiterals(literals: readonly Literal[], all: bigint): readonly Literal[] {
  const best = new Map<bigint, Literal>();
  for (const literal of literals) {
    if (literal.values === 0n || literal.values === all) continue;
    const known = best.get(literal.values);
    if (known === undefined || literal.cost < known.cost) best.set(literal.values, literal);
  }
  return [...best.values()];
}

// Formulas of at most three literals

/** Keeps the cheapest of the candidates of one size, the first of equally cheap ones. */
class Best {
  found: Candidate | null = null;

  offer(cost: number, make: () => CarrierFormula): void {
    if (this.found === null || cost < this.found.cost) this.found = { cost, formula: make() };
  }
}

function shortOf(literals: readonly Literal[], values: bigint, all: bigint, cases: number): Candidate | null {
  const single = literals.find((literal) => literal.values === values);
  if (single !== undefined) return single;
  if (literals.length > MANY_LITERALS) return null;
  // A conjunct is true wherever the whole is, a disjunct only there.
  const above = literals.filter((literal) => (values & ~literal.values) === 0n);
  const below = literals.filter((literal) => (literal.values & ~values) === 0n);
  const two = new Best();
  forPairs(above, (a, b) => {
    if ((a.values & b.values) === values) two.offer(a.cost + b.cost, () => allOf([a.formula, b.formula]));
  });
  forPairs(below, (a, b) => {
    if ((a.values | b.values) === values) two.offer(a.cost + b.cost, () => anyOf([a.formula, b.formula]));
  });
  if (two.found !== null && two.found.cost <= PLAIN_COST) return two.found;
  if (literals.length > FEW_LITERALS || cases > FEW_CASES) return two.found;
  // Two literals of which one is hard to read may be longer than three.
  const three = two;
  above.forEach((a, index) => {
    forPairs(above.slice(index + 1), (b, c) => {
      if ((a.values & b.values & c.values) === values)
        three.offer(a.cost + b.cost + c.cost, () => allOf([a.formula, b.formula, c.formula]));
    });
    const inside = literals.filter((b) => (a.values & b.values & ~values) === 0n);
    forPairs(inside, (b, c) => {
      if ((a.values & (b.values | c.values)) === values)
        three.offer(a.cost + b.cost + c.cost + 1, () => allOf([a.formula, anyOf([b.formula, c.formula])]));
    });
  });
  below.forEach((a, index) => {
    forPairs(below.slice(index + 1), (b, c) => {
      if ((a.values | b.values | c.values) === values)
        three.offer(a.cost + b.cost + c.cost, () => anyOf([a.formula, b.formula, c.formula]));
    });
    const rest = values & ~a.values;
    const around = literals.filter((b) => (rest & ~b.values) === 0n);
    forPairs(around, (b, c) => {
      if ((a.values | (b.values & c.values)) === values)
        three.offer(a.cost + b.cost + c.cost, () => anyOf([a.formula, allOf([b.formula, c.formula])]));
    });
  });
  if (three.found !== null) return three.found;
  return biconditionalOf(literals, values, all);
}

/** One literal exactly if another. */
function biconditionalOf(literals: readonly Literal[], values: bigint, all: bigint): Candidate | null {
  const byValues = new Map(literals.map((literal) => [literal.values, literal]));
  const best = new Best();
  for (const left of literals) {
    const right = byValues.get(all ^ left.values ^ values);
    if (right === undefined) continue;
    best.offer(left.cost + right.cost, () => ({ kind: "iff", left: left.formula, right: right.formula }));
  }
  return best.found;
}

function forPairs(literals: readonly Literal[], see: (first: Literal, second: Literal) => void): void {
  for (let first = 0; first < literals.length; first += 1)
    for (let second = first + 1; second < literals.length; second += 1)
      see(literals[first]!, literals[second]!);
}

// Disjunctions of conjunctions

/** Literals that are true together only where the whole is to be true. */
type Cube = readonly Literal[];

interface CubeValues {
  readonly cube: Cube;
  /** Where it is true. */
  readonly own: bigint;
}

function valuesOf(cube: Cube, all: bigint): bigint {
  return cube.reduce((values, literal) => values & literal.values, all);
}

function costOf(cube: Cube): number {
  return cube.reduce((cost, literal) => cost + literal.cost, 4);
}

/**
 * Cubes that together are true exactly at the given values: at each step the one that covers most cases not yet covered
 * for its cost; then those that the others make superfluous are left out.
 * @returns null when there are too many
 */
function cover(
  literals: readonly Literal[],
  values: bigint,
  all: bigint,
  cases: number,
): readonly Cube[] | null {
  let cubes = cases > FEW_CASES ? [] : cubesWithin(literals, values);
  const chosen: CubeValues[] = [];
  let left = values;
  while (left !== 0n) {
    let best: CubeValues | null = null;
    let most = 0;
    for (const one of cubes) {
      const worth = countBits(one.own & left) / costOf(one.cube);
      if (worth > most) [best, most] = [one, worth];
    }
    if (best === null) {
      const cube = cubeAround(literals, left & -left, values, all);
      best = { cube, own: valuesOf(cube, all) };
    }
    if (chosen.length === MOST_CUBES) return null;
    chosen.push(best);
    left &= ~best.own;
    cubes = cubes.filter(({ own }) => (own & left) !== 0n);
  }
  for (let at = chosen.length - 1; at >= 0; at -= 1) {
    const others = chosen.reduce((sum, one, index) => (index === at ? sum : sum | one.own), 0n);
    if (others === values) chosen.splice(at, 1);
  }
  return chosen.map(({ cube }) => cube);
}

/** All cubes of few literals, none of which could be left out; of those with the same values the cheapest. */
function cubesWithin(literals: readonly Literal[], values: bigint): readonly CubeValues[] {
  const best = new Map<bigint, CubeValues>();
  const isWithin = (own: bigint) => own !== 0n && (own & ~values) === 0n;
  const add = (own: bigint, cube: Cube) => {
    const known = best.get(own);
    if (known === undefined || costOf(cube) < costOf(known.cube)) best.set(own, { cube, own });
  };
  for (const literal of literals) if (isWithin(literal.values)) add(literal.values, [literal]);
  if (literals.length > MANY_LITERALS) return [...best.values()];
  const isThree = literals.length <= FEW_LITERALS;
  const open = literals.filter((literal) => !isWithin(literal.values));
  open.forEach((a, index) => {
    for (let second = index + 1; second < open.length; second += 1) {
      const b = open[second]!;
      const two = a.values & b.values;
      if (isWithin(two)) add(two, [a, b]);
      else if (two !== 0n && isThree)
        for (let third = second + 1; third < open.length; third += 1) {
          const c = open[third]!;
          const three = two & c.values;
          if (isWithin(three) && !isWithin(a.values & c.values) && !isWithin(b.values & c.values))
            add(three, [a, b, c]);
        }
    }
  });
  // Sorting is stable: of equally cheap ones those that were met first.
  return [...best.values()].sort((a, b) => costOf(a.cube) - costOf(b.cube)).slice(0, MOST_CHOICES);
}

/**
 * A cube that is true of one case: literals true there, each the one that leaves out most of the cases where the whole is
 * to be false; then without those that are not needed.
 */
function cubeAround(literals: readonly Literal[], one: bigint, values: bigint, all: bigint): Cube {
  const there = literals.filter((literal) => (literal.values & one) !== 0n);
  let chosen: Literal[] = [];
  let wrong = all & ~values;
  while (wrong !== 0n) {
    let best: Literal | null = null;
    let most = 0;
    for (const literal of there) {
      const worth = countBits(wrong & ~literal.values) / literal.cost;
      if (worth > most) [best, most] = [literal, worth];
    }
    if (best === null) throw new Error("literals that do not tell cases apart");
    chosen.push(best);
    wrong &= best.values;
  }
  for (const literal of [...chosen].reverse()) {
    const without = chosen.filter((other) => other !== literal);
    if ((valuesOf(without, all) & ~values) === 0n) chosen = without;
  }
  return chosen;
}

/**
 * A disjunction of conjunctions.
 * @param isTurned a conjunction of disjunctions instead
 */
function formulaOf(cubes: readonly Cube[], isTurned: boolean): Candidate {
  const [inner, outer] = isTurned ? [anyOf, allOf] : [allOf, anyOf];
  const formula = outer(cubes.map((cube) => inner(cube.map((literal) => literal.formula))));
  return { formula, cost: cubes.reduce((cost, cube) => cost + costOf(cube), 0) };
}

function countBits(values: bigint): number {
  let count = 0;
  for (let rest = values; rest !== 0n; rest >>= 32n) {
    let word = Number(rest & 0xffffffffn) | 0;
    word -= (word >>> 1) & 0x55555555;
    word = (word & 0x33333333) + ((word >>> 2) & 0x33333333);
    count += Math.imul((word + (word >>> 4)) & 0x0f0f0f0f, 0x01010101) >>> 24;
  }
  return count;
}
