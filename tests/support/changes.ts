/** Changed copies of JSON values, one change each: what tests of the checker feed it. */

/** A word of each kind that evidence has, and some that it does not have. */
const WORDS = [
  "x",
  "y",
  "R",
  "0.0",
  "1.0",
  "forall",
  "exists",
  "and",
  "or",
  "not",
  "holds",
  "fails",
  "finite",
];
const MORE = ["independent", "redundant", "incomparable", "stronger", "different", "open", "entails", "", 1];

/**
 * All copies of a value with one leaf, key or list member changed, left out, doubled or put first.
 * @param wordsFor what is put in place of a word
 */
export function* changes(
  value: unknown,
  wordsFor: () => readonly unknown[] = () => [...WORDS, ...MORE],
): Generator<unknown> {
  if (Array.isArray(value)) {
    for (const [index, member] of value.entries()) {
      for (const changed of changes(member, wordsFor)) yield value.with(index, changed);
      yield value.toSpliced(index, 1);
      yield value.toSpliced(index, 0, member);
      if (index > 0) yield value.with(index, value[0]).with(0, member);
    }
    yield [];
  } else if (typeof value === "object" && value !== null) {
    for (const [key, member] of Object.entries(value)) {
      for (const changed of changes(member, wordsFor)) yield { ...value, [key]: changed };
      const { [key]: _, ...rest } = value as Record<string, unknown>;
      yield rest;
    }
    yield { ...value, foreign: 1 };
  } else if (typeof value === "number") yield* [value + 1, value - 1, -value, 0.5, null, `${value}`];
  else if (typeof value === "string") yield* wordsFor().filter((word) => word !== value);
  else if (typeof value === "boolean") yield* [!value, "something", 0];
  else yield* ["something", 0, [], [0]];
}

/** The words that occur in a value. */
export function wordsIn(value: unknown): readonly string[] {
  const found = new Set<string>();
  const look = (part: unknown): void => {
    if (typeof part === "string") found.add(part);
    else if (Array.isArray(part)) part.forEach(look);
    else if (typeof part === "object" && part !== null) {
      for (const [key, member] of Object.entries(part)) {
        found.add(key);
        look(member);
      }
    }
  };
  look(value);
  return [...found];
}
