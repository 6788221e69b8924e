/** A word for each atom that shows at sight that some atoms cannot be unified: the heads of its first arguments. */
import { HEADER, type TermBank } from "./terms.ts";

/** Bits for each of the first three arguments: one more than its head's number, modulo; 0 for a variable. */
const BITS = 10;
const FIELD = (1 << BITS) - 1;

export function filterOf(bank: TermBank, atom: number): number {
  const { words } = bank;
  const arity = Math.min(3, bank.arities[words[atom]!]!);
  let filter = 0;
  for (let k = 0; k < arity; k += 1) {
    const arg = words[atom + HEADER + k]!;
    if (arg > 0) filter |= ((words[arg]! % FIELD) + 1) << (BITS * k);
  }
  return filter;
}

/**
 * The fields of a filter that are no variables. Atoms with filters f and g, masks m and n, cannot be unified where
 * (f xor g) and m and n is not 0.
 */
export function maskOf(filter: number): number {
  let mask = 0;
  for (let k = 0; k < 3; k += 1) if (((filter >> (BITS * k)) & FIELD) !== 0) mask |= FIELD << (BITS * k);
  return mask;
}
