/**
 * Unit propagation with its reasons, so that a step which cites much can be told as several smaller ones. It is the
 * notion of consequence of the format of evidence, but for one thing: an equation and the equation turned round are the
 * same here.
 */

import type { ClauseRecord, LiteralRecord } from "../../lib/evidence/format.ts";
import { simplifyClause } from "../../lib/logic/records/clause-form.ts";
import { atomOf } from "../../lib/logic/records/formulas.ts";

/** A clause that was used: all its literals but one are false, or all. */
interface Firing {
  /** Place of the clause among those given. */
  readonly given: number;
  /** The literal that it makes true; null where all are false. */
  readonly literal: LiteralRecord | null;
  /** Earlier firings that made the others false. */
  readonly reasons: readonly number[];
  /** Literals of the goal that are among the others: they are false by assumption. */
  readonly assumed: readonly LiteralRecord[];
}

/** The firings up to a contradiction from the negated goal and the clauses given; null when there is none. */
export function propagate(goal: ClauseRecord, given: readonly ClauseRecord[]): readonly Firing[] | null {
  const firings: Firing[] = [];
  /** For each atom its value, and the firing that gave it; a literal of the goal where that is assumed. */
  const known = new Map<string, { readonly value: boolean; readonly by: number | LiteralRecord }>();
  for (const literal of goal) known.set(atomKey(literal), { value: isNegated(literal), by: literal });
  let waiting = given.flatMap((clause, place) => {
    const literals = simplifyClause(clause);
    return literals === null ? [] : [{ place, literals }];
  });
  for (let before = -1; waiting.length !== before; ) {
    before = waiting.length;
    const kept: typeof waiting = [];
    for (const one of waiting) {
      const { place, literals } = one;
      const isTrue = (literal: LiteralRecord) => known.get(atomKey(literal))?.value === !isNegated(literal);
      if (literals.some(isTrue)) continue;
      const open = literals.filter((literal) => !known.has(atomKey(literal)));
      if (open.length > 1) {
        kept.push(one);
        continue;
      }
      const [literal = null] = open;
      const reasons: number[] = [];
      const assumed: LiteralRecord[] = [];
      for (const other of literals) {
        const by = known.get(atomKey(other))?.by;
        if (typeof by === "number") reasons.push(by);
        else if (by !== undefined) assumed.push(by);
      }
      firings.push({ given: place, literal, reasons, assumed });
      if (literal === null) return firings;
      known.set(atomKey(literal), { value: !isNegated(literal), by: firings.length - 1 });
    }
    waiting = kept;
  }
  return null;
}

/** A clause between, and what it follows from: clauses given, and earlier ones between. */
export interface Between {
  readonly clause: ClauseRecord;
  readonly from: readonly { readonly kind: "given" | "between"; readonly place: number }[];
}

/**
 * Clauses that lead from those given to the goal, the goal last, each by one rule and facts as far as that goes.
 * @returns null when there is nothing to put between
 */
export function stepsBetween(goal: ClauseRecord, given: readonly ClauseRecord[]): readonly Between[] | null {
  const firings = propagate(goal, given);
  if (firings === null) return null;
  const needed = neededFirings(firings);
  const between: Between[] = [];
  /** For each firing what it follows from; a clause between once it has become one. */
  const sources = new Map<number, Between["from"]>();
  const assumed = new Map<number, readonly LiteralRecord[]>();
  const isRule = ({ kind, place }: Between["from"][number]) =>
    (kind === "given" ? given[place]! : between[place]!.clause).length > 1;
  for (const number of needed) {
    const { given: place, literal, reasons, assumed: own } = firings[number]!;
    const all = new Map(
      [...own, ...reasons.flatMap((reason) => assumed.get(reason)!)].map((one) => [atomKey(one), one]),
    );
    assumed.set(number, [...all.values()]);
    const gather = () =>
      unique([{ kind: "given" as const, place }, ...reasons.flatMap((reason) => sources.get(reason)!)]);
    if (gather().filter(isRule).length > 1)
      for (const reason of reasons) {
        const from = sources.get(reason)!;
        if (from.length === 1 || !from.some(isRule)) continue;
        between.push({ clause: [firings[reason]!.literal!, ...assumed.get(reason)!], from });
        sources.set(reason, [{ kind: "between", place: between.length - 1 }]);
      }
    sources.set(number, gather());
    if (literal === null) between.push({ clause: goal, from: gather() });
  }
  return between.length > 1 ? between : null;
}

/** The numbers of the firings that the last one needs, in order. */
function neededFirings(firings: readonly Firing[]): readonly number[] {
  const reached = new Set([firings.length - 1]);
  for (let number = firings.length - 1; number >= 0; number -= 1)
    if (reached.has(number)) for (const reason of firings[number]!.reasons) reached.add(reason);
  return [...reached].sort((a, b) => a - b);
}

function unique(from: Between["from"]): Between["from"] {
  return [...new Map(from.map((one) => [`${one.kind} ${one.place}`, one])).values()];
}

export function isNegated(literal: LiteralRecord): boolean {
  return literal[0] === "not";
}

/** The same for an equation and the equation turned round: readers need no step for that. */
export function atomKey(literal: LiteralRecord): string {
  const atom = atomOf(literal);
  if (atom[0] !== "=") return JSON.stringify(atom);
  return JSON.stringify([
    "=",
    ...atom
      .slice(1)
      .map((term) => JSON.stringify(term))
      .sort(),
  ]);
}
