/** The known name that is nearest to a misspelled one. */

/** Longer words are not compared: the table would cost more than the hint is worth. */
const LONGEST = 40;

/**
 * The distance of Damerau and Levenshtein in its restricted form (optimal string alignment): how many insertions,
 * deletions, substitutions and exchanges of neighbours lead from one word to the other, no letter being edited
 * twice (Damerau 1964; Levenshtein 1966). Upper and lower case differ by half an edit.
 */
export function editDistance(from: string, to: string): number {
  const a = [...from];
  const b = [...to];
  let before: number[] = [];
  let last = b.map((_, index) => index);
  last.push(b.length);
  for (let i = 1; i <= a.length; i += 1) {
    const row = [i];
    for (let j = 1; j <= b.length; j += 1) {
      const substitution = costOf(a[i - 1]!, b[j - 1]!);
      let cost = Math.min(last[j]! + 1, row[j - 1]! + 1, last[j - 1]! + substitution);
      if (i > 1 && j > 1 && a[i - 1] === b[j - 2] && a[i - 2] === b[j - 1])
        cost = Math.min(cost, before[j - 2]! + 1);
      row.push(cost);
    }
    before = last;
    last = row;
  }
  return last[b.length]!;
}

function costOf(a: string, b: string): number {
  if (a === b) return 0;
  return a.toLowerCase() === b.toLowerCase() ? 0.5 : 1;
}

/** How far a name may be from what was written and still be proposed: a third of its length, at most 3. */
function cutOff(word: string): number {
  const length = [...word].length;
  return length <= 1 ? 0.5 : Math.min(3, Math.max(1, Math.floor(length / 3)));
}

/** The nearest of the candidates within the cut-off; of equally near ones the first in code-unit order; else null. */
export function nearestName(word: string, candidates: Iterable<string>): string | null {
  if (word.length > LONGEST) return null;
  let best: string | null = null;
  let least = cutOff(word);
  for (const candidate of candidates) {
    if (candidate === word || Math.abs(candidate.length - word.length) > least) continue;
    const distance = editDistance(word, candidate);
    if (distance < least || (distance === least && (best === null || candidate < best))) {
      best = candidate;
      least = distance;
    }
  }
  return best;
}
