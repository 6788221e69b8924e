/**
 * Finite samples of homogeneous structures, built another way than the carriers list them, and truth in the whole
 * structure by looking at a sample alone.
 *
 * A sample has stages S₁ ⊆ S₂ ⊆ …, such that every element of the whole structure stands to any elements of S₁, …, Sᵢ, one
 * from each, just as some element of Sᵢ₊₁ does. Then the quantifier at depth i may range over Sᵢ: by induction from the
 * inside, a formula about elements of S₁, …, Sᵢ₋₁ is true in the whole structure if and only if it comes out true so,
 * since in a homogeneous structure two elements that stand to others alike satisfy the same formulas with them. So one
 * element for each way to stand to the others is enough, too.
 */
import type { Formula } from "../../lib/logic/formula.ts";
import type { GenericDescription } from "../../lib/logic/structure-definition.ts";

export interface Sample<Element> {
  readonly stages: readonly (readonly Element[])[];
  /** How elements stand to each other; the same for tuples of the same kind, and for no others. */
  signature(tuple: readonly Element[]): string;
}

/** For each relation, the signatures of the tuples at which it holds. */
export type SignatureTables = ReadonlyMap<string, ReadonlySet<string>>;

/** What a quantifier ranges over, by the elements that those around it have chosen, from the outermost. */
export type Range<Element> = (chosen: readonly Element[]) => readonly Element[];

/** The whole stage. */
export function stageOf<Element>({ stages }: Sample<Element>): Range<Element> {
  return (chosen) => stages[chosen.length]!;
}

/** Of the stage, one element for each way in which its elements stand to those chosen. */
export function representativesOf<Element>({ stages, signature }: Sample<Element>): Range<Element> {
  const known = new Map<string, readonly Element[]>();
  return (chosen) => {
    const key = chosen.join();
    let elements = known.get(key);
    if (elements === undefined) {
      const bySignature = new Map<string, Element>();
      for (const element of stages[chosen.length]!) {
        const name = signature([...chosen, element]);
        if (!bySignature.has(name)) bySignature.set(name, element);
      }
      elements = [...bySignature.values()];
      known.set(key, elements);
    }
    return elements;
  };
}

/** Truth of a sentence that has at most as many quantifiers one inside another as there are stages. */
export function isTrueByStages<Element>(
  formula: Formula,
  sample: Sample<Element>,
  tables: SignatureTables,
  range: Range<Element> = stageOf(sample),
): boolean {
  return isTrue(formula, new Map(), []);

  function isTrue(part: Formula, values: ReadonlyMap<string, Element>, chosen: readonly Element[]): boolean {
    const inner = (smaller: Formula) => isTrue(smaller, values, chosen);
    const elementAt = (variable: string) => values.get(variable)!;
    switch (part.kind) {
      case "true":
        return true;
      case "false":
        return false;
      case "atom":
        return tables.get(part.relation.name)!.has(sample.signature(part.args.map(elementAt)));
      case "equal":
        return elementAt(part.left) === elementAt(part.right);
      case "not":
        return !inner(part.body);
      case "and":
        return part.parts.every(inner);
      case "or":
        return part.parts.some(inner);
      case "implies":
        return !inner(part.left) || inner(part.right);
      case "iff":
        return inner(part.left) === inner(part.right);
      case "forall":
      case "exists": {
        const check = (element: Element) =>
          isTrue(part.body, new Map(values).set(part.variable, element), [...chosen, element]);
        return part.kind === "forall" ? range(chosen).every(check) : range(chosen).some(check);
      }
    }
  }
}

/** Tuples with one element from each of the first stages. */
export function tuplesOf<Element>(sample: Sample<Element>, length: number): (readonly Element[])[] {
  let tuples: (readonly Element[])[] = [[]];
  for (const stage of sample.stages.slice(0, length))
    tuples = tuples.flatMap((tuple) => stage.map((element) => [...tuple, element]));
  return tuples;
}

/** Whether there is an arc (for a graph an edge, for an order a <) from one element to another. */
type Arc<Element> = (from: Element, to: Element) => boolean;

/** For j = 1, 2, … and i < j: `=` for the same element, else 1 for an arc from that at i to that at j, plus 2 for one back. */
function signatureOf<Element>(arc: Arc<Element>, tuple: readonly Element[]): string {
  let signature = `${tuple.length}:`;
  for (let j = 1; j < tuple.length; j += 1)
    for (let i = 0; i < j; i += 1)
      signature +=
        tuple[i] === tuple[j]
          ? "="
          : Number(arc(tuple[i]!, tuple[j]!)) + 2 * Number(arc(tuple[j]!, tuple[i]!));
  return signature;
}

/**
 * Natural numbers i < j, related as the digit of j at place i says: with binary digits the graph that Ackermann's coding
 * of finite sets gives (Ackermann 1937, Rado 1964), and a tournament; in base four a digraph. The witness for elements
 * x, y, … < m and any choice of digits is the number with these digits at the places x, y, …, and a 1 at the place m.
 */
export function digitSample(
  of: Exclude<GenericDescription["of"], "partial-order">,
  stages: number,
): Sample<bigint> {
  const base = of === "digraph" ? 4n : 2n;
  const digit = (number: bigint, place: bigint) => (number / base ** place) % base;
  const arc = (from: bigint, to: bigint): boolean => {
    if (from > to) {
      const given = digit(from, to);
      return of === "graph" ? given === 1n : of === "tournament" ? given === 0n : given >= 2n;
    }
    return of === "digraph" ? digit(to, from) % 2n === 1n : digit(to, from) === 1n;
  };
  const all: bigint[][] = [[0n]];
  const sample = { stages: all, signature: (tuple: readonly bigint[]) => signatureOf(arc, tuple) };
  while (all.length < stages) {
    const next = new Set(all.at(-1)!);
    for (const tuple of tuplesOf(sample, all.length)) {
      const places = [...new Set(tuple)];
      let last = 1n;
      while (places.some((place) => place >= last)) last += 1n;
      for (let choice = 0n; choice < base ** BigInt(places.length); choice += 1n) {
        let witness = base ** last;
        for (const [index, place] of places.entries())
          witness += digit(choice, BigInt(index)) * base ** place;
        next.add(witness);
      }
    }
    all.push([...next]);
  }
  return sample;
}

/**
 * A partial order that grows by one element after another: for elements that are there and every choice of which of them
 * are to be below the new one and which above it, where that is possible. Everything below the former is below the new
 * one, everything above the latter is above it; that must make no more of them comparable to it, and whatever is below it
 * must be below whatever is above it.
 */
export function orderSample(
  stages: number,
): Sample<number> & { readonly less: readonly ReadonlySet<number>[] } {
  /** For each element those that are greater. */
  const less: Set<number>[] = [new Set()];
  const arc = (from: number, to: number) => less[from]!.has(to);
  const all: number[][] = [[0]];
  const sample = { stages: all, less, signature: (tuple: readonly number[]) => signatureOf(arc, tuple) };
  while (all.length < stages) {
    const next = [...all.at(-1)!];
    for (const tuple of tuplesOf(sample, all.length)) {
      const known = new Set(next.map((element) => sample.signature([...tuple, element])));
      const places = [...new Set(tuple)];
      for (let choice = 0; choice < 3 ** places.length; choice += 1) {
        const side = (index: number) => Math.floor(choice / 3 ** index) % 3;
        const [below, above] = [1, 2].map((wanted) => places.filter((_, index) => side(index) === wanted));
        const elements = less.map((_, element) => element);
        const lower = elements.filter((e) => below!.some((b) => e === b || arc(e, b)));
        const upper = elements.filter((e) => above!.some((a) => e === a || arc(a, e)));
        if (
          places.some(
            (p) => lower.includes(p) !== below!.includes(p) || upper.includes(p) !== above!.includes(p),
          )
        )
          continue;
        if (!lower.every((l) => upper.every((u) => arc(l, u)))) continue;
        const element = less.length;
        less.push(new Set(upper));
        for (const l of lower) less[l]!.add(element);
        const signature = sample.signature([...tuple, element]);
        if (known.has(signature)) {
          less.pop();
          for (const l of lower) less[l]!.delete(element);
          continue;
        }
        known.add(signature);
        next.push(element);
      }
    }
    all.push(next);
  }
  return sample;
}

/** The atoms of the finest dyadic algebra of a sample: intervals of [0, 1), as the bits of a number. */
const FINEST = 4;
const BITS = 2 ** FINEST;

/**
 * Unions of dyadic intervals of [0, 1), at most four in a tuple; a signature has bit m set when cell m is not empty.
 *
 * Sᵢ has those of intervals of length 2^−i; without zero not the empty one, and without top only those that end before
 * 1: unions and differences of these end before 1 too, each has a larger one, and none is larger than all. An element of
 * the whole meets each cell of x₁ ∈ S₁, …, xᵢ ∈ Sᵢ in nothing, all, or a proper part; the cells are unions of intervals of
 * length 2^−i, so that halves of these make a proper part, and without top one that ends before 1.
 */
export function dyadicSample(zero: boolean, top: boolean, stages: number): Sample<number> {
  if (stages > FINEST) throw new RangeError(`${stages} stages`);
  const all = Array.from({ length: stages }, (_, index) => {
    const width = BITS / 2 ** (index + 1);
    const elements: number[] = [];
    for (let union = zero ? 0 : 1; union < 2 ** (BITS / width); union += 1) {
      let bits = 0;
      for (let bit = 0; bit < BITS; bit += 1) if ((union >>> Math.floor(bit / width)) & 1) bits |= 1 << bit;
      if (top || ((bits >>> (BITS - 1)) & 1) === 0) elements.push(bits);
    }
    return elements;
  });
  return {
    stages: all,
    signature(tuple) {
      let nonempty = 0;
      for (let bit = 0; bit < BITS; bit += 1) {
        let cell = 0;
        for (let place = 0; place < tuple.length; place += 1) cell |= ((tuple[place]! >>> bit) & 1) << place;
        nonempty |= 1 << cell;
      }
      return `${tuple.length}:${nonempty}`;
    },
  };
}
