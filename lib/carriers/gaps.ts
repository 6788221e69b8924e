/** Whole numbers on a line, and the gaps between neighbouring ones, cut where larger ones need not be told apart. */

/**
 * From which size on two gaps between neighbours are alike with so many quantifiers to come: 2^toCome · (offset + 1).
 * Why this suffices is proved at `IntegerLine` and `HalfLine`.
 */
export function gapThreshold(offset: number, toCome: number): number {
  return 2 ** toCome * (offset + 1);
}

/**
 * The same elements moved together: positions below `beyond` stay as they are; all others stay at `beyond` or more,
 * as near to each other and to `beyond` as they can while a gap between neighbours that was less than `largest` stays
 * what it was and every other is at least `largest`.
 *
 * Two lists of positions have the same result if and only if they have the same order (with the same repeats), the
 * same gaps between neighbours cut at `largest`, and position by position the same minimum of position and `beyond`.
 *
 * @returns one position for each element, in the order given
 */
export function cutGaps(positions: readonly number[], largest: number, beyond: number): readonly number[] {
  if (positions.length === 0) return positions;
  const sorted = [...positions].sort((a, b) => a - b);
  const moved = [Math.min(sorted[0]!, beyond)];
  for (let i = 1; i < sorted.length; i += 1) {
    const gap = Math.min(sorted[i]! - sorted[i - 1]!, largest);
    moved.push(sorted[i]! < beyond ? sorted[i]! : Math.max(beyond, moved[i - 1]! + gap));
  }
  return positions.map((position) => moved[sorted.indexOf(position)]!);
}

/** A count of configurations, infinite where it is too large to be exact. */
export function boundOf(count: number): number {
  return count <= Number.MAX_SAFE_INTEGER ? count : Number.POSITIVE_INFINITY;
}
