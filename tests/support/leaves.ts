/** Changing one leaf of JSON at a time. */

/** Everything in a value that can be changed by itself: the paths to its numbers, texts, booleans and nulls. */
export function leavesOf(value: unknown, path: readonly (string | number)[] = []): (string | number)[][] {
  if (typeof value !== "object" || value === null) return [[...path]];
  return Object.entries(value).flatMap(([key, part]) =>
    leavesOf(part, [...path, Array.isArray(value) ? Number(key) : key]),
  );
}

/** Changes what is at the end of a path to something else of its kind. */
export function changeAt(value: unknown, path: readonly (string | number)[]): void {
  const holder = path.slice(0, -1).reduce((part, key) => (part as never)[key], value) as Record<
    string,
    unknown
  >;
  const key = path.at(-1)!;
  const old = holder[key];
  if (typeof old === "number") holder[key] = old + 1;
  else if (typeof old === "boolean") holder[key] = !old;
  else if (old === null) holder[key] = 0;
  else holder[key] = `${String(old)}x`;
}
