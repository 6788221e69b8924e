/** Breaking symmetry: of all tables that differ by a renaming of elements, keep only small ones. */
import type { Carrier } from "../carriers/carrier.ts";
import type { RelationSymbol } from "../logic/formula.ts";
import type { Meter } from "../logic/meter.ts";
import type { ClauseSink } from "./circuit.ts";

/** Table positions compared over all symmetries of one search, at most; the rest is cut off. */
const POSITIONS_BOUND = 60_000;

/** Entries looked at before an interrupt is looked for. */
const POLLED_AT_ONCE = 4096;

/**
 * Adds clauses that keep, of every set of isomorphic structures on the carrier, at least the one whose table is
 * least in lexicographic order, false before true (Crawford, Ginsberg, Luks & Roy 1996). One chain of clauses for
 * each symmetry that the carrier lists; a chain may be cut short, which keeps more structures and loses none.
 *
 * @param variableOf the variable of an entry: relation by its number in `relations`, then kind
 * @throws WorkEnded when the meter's budget ends or the user interrupts
 */
export function breakSymmetry(
  carrier: Carrier,
  relations: readonly RelationSymbol[],
  variableOf: (relation: number, kind: number) => number,
  sink: ClauseSink,
  meter: Meter,
): void {
  const symmetries = carrier.symmetries();
  if (symmetries.length === 0) return;
  // Relations with few places first: their entries say most about which elements can be exchanged.
  const order = relations
    .map((_, index) => index)
    .sort((a, b) => relations[a]!.places - relations[b]!.places);
  const each = Math.max(1, Math.floor(POSITIONS_BOUND / symmetries.length));
  let unpolled = 0;
  for (const symmetry of symmetries) {
    let equalSoFar: number | null = null;
    let compared = 0;
    comparing: for (const relation of order) {
      const { places } = relations[relation]!;
      const kinds = carrier.kindCount(places);
      for (let kind = 0; kind < kinds; kind += 1) {
        unpolled += 1;
        if (unpolled === POLLED_AT_ONCE) {
          meter.charge(0);
          unpolled = 0;
        }
        const image = symmetry.image(places, kind);
        // Where the image comes earlier, an exchange has already made the two entries equal.
        if (image <= kind) continue;
        const own = variableOf(relation, kind);
        const other = variableOf(relation, image);
        const soFar: readonly number[] = equalSoFar === null ? [] : [-equalSoFar];
        sink.addClause([...soFar, -own, other]);
        compared += 1;
        if (compared >= each) break comparing;
        const stillEqual = sink.newVariable();
        sink.addClause([...soFar, -own, stillEqual]);
        sink.addClause([...soFar, other, stillEqual]);
        equalSoFar = stillEqual;
      }
    }
    meter.charge(compared);
  }
}
