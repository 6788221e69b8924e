/** All two-place relations on few points, one of each class of isomorphic ones, by trying every renumbering. */

/** Pairs of points counted from 1. */
export type Pairs = readonly (readonly number[])[];

/** Of each class the relation whose bits are the least number; for up to 4 points. */
export function relationsUpToIsomorphism(size: number): readonly Pairs[] {
  const moves = permutations(size).map((order) =>
    Array.from(
      { length: size * size },
      (_, bit) => order[Math.floor(bit / size)]! * size + order[bit % size]!,
    ),
  );
  const found: number[][][] = [];
  for (let bits = 0; bits < 2 ** (size * size); bits += 1) {
    const isLeast = moves.every((move) => {
      let moved = 0;
      for (let bit = 0; bit < move.length; bit += 1) if ((bits >> bit) & 1) moved |= 1 << move[bit]!;
      return moved >= bits;
    });
    if (!isLeast) continue;
    const pairs: number[][] = [];
    for (let bit = 0; bit < size * size; bit += 1)
      if ((bits >> bit) & 1) pairs.push([Math.floor(bit / size) + 1, (bit % size) + 1]);
    found.push(pairs);
  }
  return found;
}

function permutations(size: number): number[][] {
  if (size === 0) return [[]];
  return permutations(size - 1).flatMap((shorter) =>
    Array.from({ length: size }, (_, at) => [...shorter.slice(0, at), size - 1, ...shorter.slice(at)]),
  );
}
