/**
 * Literals. At the interface a literal is a signed integer as in DIMACS CNF: variable v ≥ 1 is `v`, its negation
 * `−v`. Inside it is packed: `2v` for v, `2v + 1` for its negation, so that `literal ^ 1` negates, `literal >> 1`
 * is the variable, and literals index arrays. Index 0 and 1 belong to no variable.
 */

/** Packs a signed literal. */
export function pack(signed: number): number {
  return signed > 0 ? signed * 2 : 1 - signed * 2;
}

/** The signed literal of a packed one. */
export function unpack(literal: number): number {
  return (literal & 1) === 0 ? literal >> 1 : -(literal >> 1);
}

/** A copy of the array with room for `capacity` entries; new entries are `fill`. */
export function grownInt32(old: Int32Array, capacity: number, fill = 0): Int32Array {
  const grown = new Int32Array(capacity);
  grown.set(old);
  if (fill !== 0) grown.fill(fill, old.length);
  return grown;
}
