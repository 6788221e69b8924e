/** Elements in groups: the parts of a sum, the copies of a product, the tags of tuples. */

/**
 * The place, among the elements of its own group, of the element at a place.
 * @param groups the group of each element
 */
export function placeInside(groups: readonly number[], place: number): number {
  let inside = 0;
  for (let before = 0; before < place; before += 1) if (groups[before] === groups[place]) inside += 1;
  return inside;
}

/** For each of so many groups, where among its elements those are that stand at the given places. */
export function placesInside(
  groups: readonly number[],
  places: readonly number[],
  count: number,
): readonly (readonly number[])[] {
  const inside = Array.from({ length: count }, (): number[] => []);
  for (const place of places) inside[groups[place]!]!.push(placeInside(groups, place));
  return inside;
}

/** A name of the groups of the elements and the keys of the groups; no other has the same. */
export function keyOf(groups: readonly number[], keys: readonly (string | number)[]): string {
  let key = groups.join();
  for (const one of keys) {
    const text = `${one}`;
    key += `;${text.length};${text}`;
  }
  return key;
}

/** Members beyond which only neighbours are exchanged: all pairs would cost more than they save. */
const MANY = 6;

/** Pairs of places at which a list has the same member, the earlier one first: all, or in a long list those of neighbours. */
export function pairsWithSame(list: readonly unknown[]): readonly (readonly [number, number])[] {
  return list.flatMap((member, first) => {
    const others = [...list.keys()].filter((place) => place > first && list[place] === member);
    const kept = list.length > MANY ? others.slice(0, 1) : others;
    return kept.map((second) => [first, second] as const);
  });
}

/** The number that a number becomes when two are exchanged. */
export function exchanged(number: number, first: number, second: number): number {
  return number === first ? second : number === second ? first : number;
}
