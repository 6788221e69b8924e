/**
 * The search for structures with much symmetry: tables that a group of permutations preserves have few entries, and
 * sentences that have large models only are often true in such ones. It finds structures and never shows that there
 * are none.
 */
import { Orbits, type Permutation, plainStructure } from "../carriers/orbits.ts";
import type { Structure } from "../carriers/structure.ts";
import type { Formula, RelationSymbol } from "../logic/formula.ts";
import type { Meter } from "../logic/meter.ts";
import { MeterShare } from "../logic/share.ts";
import { findStructure } from "./search.ts";

/** Points below which structures are found by the complete search anyway. */
export const LEAST_SYMMETRIC_SIZE = 5;

/** Tuples of points that the relations of one structure may have, so that their orbits are soon counted. */
const MOST_TUPLES = 200_000;

export interface SymmetricTask {
  readonly size: number;
  /** Sets of sentences, any one of which is to hold. */
  readonly alternatives: readonly (readonly Formula[])[];
  readonly relations: readonly RelationSymbol[];
}

/** A structure on points, and the number of the set of sentences that holds in it. */
export interface SymmetricFind {
  readonly structure: Structure;
  readonly alternative: number;
}

/**
 * Looks for a structure that one of the groups of {@link groupsOn} preserves; null when none was found.
 * @param stepsEach steps for each group and set of sentences
 */
export function findSymmetric(task: SymmetricTask, meter: Meter, stepsEach: number): SymmetricFind | null {
  const { size, alternatives, relations } = task;
  const tuples = relations.reduce((sum, relation) => sum + size ** relation.places, 0);
  if (tuples > MOST_TUPLES) return null;
  for (const generators of groupsOn(size)) {
    if (!meter.spend(tuples * generators.length)) return null;
    const carrier = new Orbits(size, generators);
    for (const [alternative, sentences] of alternatives.entries()) {
      const share = new MeterShare(meter, stepsEach);
      const outcome = findStructure({ carrier, sentences, relations }, share.meter);
      if (outcome.result === "found") {
        share.settle();
        return { structure: plainStructure(outcome.structure), alternative };
      }
      if (!share.settle()) return null;
    }
  }
  return null;
}

/**
 * Groups on so many points, in the order in which they are tried, each by its generators:
 * 1. the rotations of all points, x ↦ x + 1 modulo n, first with the multiplications by squares, then alone;
 * 2. the rotations of all points but one;
 * 3. the rotations of two blocks of n/2 points at once; of two blocks with a point to spare; of three, four blocks;
 * 4. products of the rotations of a and of b points, where n = a·b and the product is not one of rotations.
 */
export function groupsOn(size: number): readonly (readonly Permutation[])[] {
  const groups: (readonly Permutation[])[] = [];
  const squares = permutation(size, (point) => (point * leastSquare(size)) % size);
  if (leastSquare(size) > 1) groups.push([rotation(size, 1, 0), squares]);
  groups.push([rotation(size, 1, 0)]);
  if (size > 2) groups.push([rotation(size, 1, 1)]);
  for (const [blocks, spare] of [
    [2, 0],
    [2, 1],
    [3, 0],
    [3, 1],
    [4, 0],
  ] as const)
    if ((size - spare) % blocks === 0 && (size - spare) / blocks > 1)
      groups.push([rotation(size, blocks, spare)]);
  for (let rows = 2; rows * rows <= size; rows += 1) {
    const columns = size / rows;
    if (!Number.isInteger(columns) || greatestCommonDivisor(rows, columns) === 1) continue;
    groups.push([
      permutation(size, (point) => (point + columns) % size),
      permutation(size, (point) => point - (point % columns) + ((point + 1) % columns)),
    ]);
  }
  return groups;
}

function permutation(size: number, of: (point: number) => number): Permutation {
  return Array.from({ length: size }, (_, point) => of(point));
}

/** Rotates blocks of equal size, of neighbouring points, and leaves the last points alone. */
function rotation(size: number, blocks: number, spare: number): Permutation {
  const length = (size - spare) / blocks;
  return permutation(size, (point) =>
    point >= size - spare ? point : point - (point % length) + ((point + 1) % length),
  );
}

/** The least number above 1 whose multiples by it, modulo n, permute the points and that is a square; 1 if none is. */
function leastSquare(size: number): number {
  for (let root = 2; root < size; root += 1) {
    const square = (root * root) % size;
    if (square > 1 && greatestCommonDivisor(square, size) === 1) return square;
  }
  return 1;
}

function greatestCommonDivisor(a: number, b: number): number {
  return b === 0 ? a : greatestCommonDivisor(b, a % b);
}
