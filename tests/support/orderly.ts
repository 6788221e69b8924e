/**
 * Orderly generation of the models of universal sentences about one two-place relation, up to isomorphism (Read 1978;
 * Faradžev 1978): a second way of counting, which shares nothing with the program's own.
 *
 * The code of a relation lists its entries (i, j) by the larger of i and j, so that the code on n points begins with
 * that on the first n − 1. A relation is canonical when no renaming of its points has a lesser code. Of a canonical
 * relation, the part on the first n − 1 points is canonical too: a renaming that made its code less would make the
 * whole code less. So every canonical relation comes of just one canonical relation on a point less, by adding a
 * layer; and where the sentences are universal, that part is a model as well. Each class is met once, and nothing
 * needs to be remembered.
 */
import { type Formula, partsOf } from "../../lib/logic/formula.ts";

/** Entries (i, j) of a relation on n points, at i · n + j, 1 where it holds. */
type Table = Uint8Array;

export interface OrderlyCount {
  readonly labelled: bigint;
  readonly unlabelled: number;
}

/** Whether a sentence is a list of ∀ before a formula without quantifiers. */
export function isUniversal(sentence: Formula): boolean {
  let body = sentence;
  while (body.kind === "forall") body = body.body;
  const hasQuantifier = (formula: Formula): boolean =>
    formula.kind === "forall" || formula.kind === "exists" || partsOf(formula).some(hasQuantifier);
  return !hasQuantifier(body);
}

/** Counts for 1, 2, … up to `largest` points. */
export function countOrderly(sentences: readonly Formula[], largest: number): OrderlyCount[] {
  if (!sentences.every(isUniversal))
    throw new Error("orderly generation by points is for universal sentences");
  const counts: OrderlyCount[] = [];
  let level: Table[] = [new Uint8Array(0)];
  for (let size = 1; size <= largest; size += 1) {
    const layer = entriesOf(size).filter(([i, j]) => Math.max(i, j) === size - 1);
    const renamings = permutations(size).map((to) => renamedEntries(size, to));
    const next: Table[] = [];
    let labelled = 0n;
    for (const smaller of level)
      for (let bits = 0; bits < 2 ** layer.length; bits += 1) {
        const table = new Uint8Array(size * size);
        for (let i = 0; i < size - 1; i += 1)
          for (let j = 0; j < size - 1; j += 1) table[i * size + j] = smaller[i * (size - 1) + j]!;
        layer.forEach(([i, j], index) => {
          table[i * size + j] = (bits >> index) & 1;
        });
        const automorphisms = countIfCanonical(table, renamings);
        if (automorphisms === 0) continue;
        if (!sentences.every((sentence) => isTrue(sentence, size, table, {}))) continue;
        next.push(table);
        labelled += BigInt(renamings.length / automorphisms);
      }
    counts.push({ labelled, unlabelled: next.length });
    level = next;
  }
  return counts;
}

/** The entries in the order of the code. */
function entriesOf(size: number): (readonly [number, number])[] {
  const entries: (readonly [number, number])[] = [];
  for (let layer = 0; layer < size; layer += 1) {
    for (let k = 0; k < layer; k += 1) entries.push([layer, k], [k, layer]);
    entries.push([layer, layer]);
  }
  return entries;
}

function permutations(size: number): number[][] {
  if (size === 0) return [[]];
  return permutations(size - 1).flatMap((rest) =>
    Array.from({ length: size }, (_, at) => [...rest.slice(0, at), size - 1, ...rest.slice(at)]),
  );
}

/** In the order of the code, at 2k the place of an entry in a table, at 2k + 1 that of its image. */
function renamedEntries(size: number, to: readonly number[]): Int32Array {
  return Int32Array.from(entriesOf(size).flatMap(([i, j]) => [i * size + j, to[i]! * size + to[j]!]));
}

/** How many renamings leave a canonical table as it is; 0 if one of them makes its code less. */
function countIfCanonical(table: Table, renamings: readonly Int32Array[]): number {
  let same = 0;
  for (const entries of renamings) {
    let difference = 0;
    for (let at = 0; difference === 0 && at < entries.length; at += 2)
      difference = table[entries[at + 1]!]! - table[entries[at]!]!;
    if (difference < 0) return 0;
    if (difference === 0) same += 1;
  }
  return same;
}

function isTrue(
  formula: Formula,
  size: number,
  table: Table,
  values: Readonly<Record<string, number>>,
): boolean {
  switch (formula.kind) {
    case "true":
      return true;
    case "false":
      return false;
    case "atom":
      return table[values[formula.args[0]!]! * size + values[formula.args[1]!]!] === 1;
    case "equal":
      return values[formula.left] === values[formula.right];
    case "not":
      return !isTrue(formula.body, size, table, values);
    case "and":
      return formula.parts.every((part) => isTrue(part, size, table, values));
    case "or":
      return formula.parts.some((part) => isTrue(part, size, table, values));
    case "implies":
      return !isTrue(formula.left, size, table, values) || isTrue(formula.right, size, table, values);
    case "iff":
      return isTrue(formula.left, size, table, values) === isTrue(formula.right, size, table, values);
    case "forall":
      for (let point = 0; point < size; point += 1)
        if (!isTrue(formula.body, size, table, { ...values, [formula.variable]: point })) return false;
      return true;
    case "exists":
      throw new Error("not universal");
  }
}
