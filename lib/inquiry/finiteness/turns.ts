/**
 * How obligations are derived. Nearly all that follow do so within a few dozen clauses by some strategy, so the turns at
 * the beginning are short and as different as they can be, and most strategies also go by way of the complements: axioms
 * about a relation and about its complement should cost the same. Of 355 obligations that were met in tests/data and in
 * its complements, the first strategy derives 319 within 20 clauses and 349 within 100; those of the other turns were
 * chosen to derive the others.
 */
import type { Engine } from "../../derivation/derive.ts";
import type { Strategy } from "../../derivation/saturation/strategy.ts";
import {
  CAREFUL_STRATEGY,
  DIRECT_STRATEGY,
  SUPPORTED_STRATEGY,
  TERSE_STRATEGY,
} from "../../derivation/saturation/strategy.ts";
import { type PlannedTurn, TURNS } from "../../derivation/schedule.ts";

const PLAIN = { premises: "all", unfold: true, miniscope: false, letters: "none", mostClauses: 32 } as const;

function by(strategy: Strategy): Engine {
  return { by: "saturation", strategy };
}
function byComplements(strategy: Strategy): Engine {
  return { by: "saturation", strategy, complemented: true };
}

/** Clauses of the turns of which an obligation is given up at first, … */
export const SHORT = 50;
/** … and of those that come next. */
export const MIDDLE = 150;
export const LONG = 330;

export const OBLIGATION_TURNS: readonly PlannedTurn[] = [
  // An axiom with other names of variables costs nothing, however large it is.
  { ...PLAIN, name: "as letters", engine: { by: "instances" }, letters: "alone", clauses: 10 },
  { ...PLAIN, name: "terse", engine: by(TERSE_STRATEGY), clauses: 25 },
  { ...PLAIN, name: "shallow, complements", engine: byComplements(SUPPORTED_STRATEGY), clauses: 25 },
  { ...PLAIN, name: "careful", engine: by(CAREFUL_STRATEGY), clauses: 50 },
  { ...PLAIN, name: "careful, complements", engine: byComplements(CAREFUL_STRATEGY), clauses: 50 },
  { ...PLAIN, name: "shallow", engine: by(SUPPORTED_STRATEGY), clauses: 90 },
  { ...PLAIN, name: "shallow, complements", engine: byComplements(SUPPORTED_STRATEGY), clauses: 90 },
  { ...PLAIN, name: "direct", engine: by(DIRECT_STRATEGY), clauses: 200 },
  { ...PLAIN, name: "direct, complements", engine: byComplements(DIRECT_STRATEGY), clauses: 200 },
  ...TURNS,
];
