import { ACTIVITY_WORD, Compaction, DELETED, HEADER, LEVELS_WORD } from "./arena.ts";
import { type Core, NONE } from "./core.ts";
import { HEAD, SIZE_WORD, WATCHES } from "./watches.ts";

/** Learned clauses that span at most as many levels are never deleted. */
const LEVELS_KEPT = 2;

/*
 * ┌──────────────────────────────────────────────────────────────────────────────────────────────────────────────┐
 * │ reduce: deletes the less useful half of the learned clauses, those that span many levels first and the least   │
 * │ active first among equals (Audemard & Simon 2009), and every clause that is true at the top level.             │
 * │                                                                                                                │
 * │ Before: no conflict is waiting to be analysed.                                                                 │
 * │ After: reasons are kept; deleted clauses are out of the arena, of `given`, `learned` and of the watches; the   │
 * │ offsets of all others may have changed, everywhere in the core.                                                │
 * └──────────────────────────────────────────────────────────────────────────────────────────────────────────────┘
 */
export function reduce(core: Core): void {
  const { words, floats } = core.arena;
  const settled = core.level === 0 ? core.trailSize : core.limits[1]!;
  if (settled > core.settled) {
    core.settled = settled;
    discardTrue(core, core.given);
    discardTrue(core, core.learned);
  }
  const candidates = core.learned.filter(
    (clause) =>
      words[clause] !== DELETED && words[clause + LEVELS_WORD]! > LEVELS_KEPT && !isReason(core, clause),
  );
  candidates.sort(
    (a, b) =>
      words[b + LEVELS_WORD]! - words[a + LEVELS_WORD]! ||
      floats[a + ACTIVITY_WORD]! - floats[b + ACTIVITY_WORD]! ||
      a - b,
  );
  for (let index = 0; index < candidates.length >> 1; index += 1) core.discard(candidates[index]!);
  compact(core);
}

/** Whether a clause is the reason of an assigned literal. */
function isReason(core: Core, clause: number): boolean {
  const first = core.arena.words[clause + HEADER]!;
  return core.values[first]! > 0 && core.origins[first | 1] === clause;
}

/** Deletes the clauses that are true at the top level. A reason at the top level is never asked for. */
function discardTrue(core: Core, clauses: readonly number[]): void {
  const { words } = core.arena;
  const { values, origins } = core;
  for (const clause of clauses) {
    const stop = clause + HEADER + words[clause]!;
    for (let at = clause + HEADER; at < stop; at += 1) {
      const literal = words[at]!;
      if (values[literal]! <= 0 || origins[literal & -2] !== 0) continue;
      if (isReason(core, clause)) origins[words[clause + HEADER]! | 1] = NONE;
      core.discard(clause);
      break;
    }
  }
}

/** Takes deleted clauses out of the arena and everything that names them. */
function compact(core: Core): void {
  const { watches, trail, origins } = core;
  const compaction = new Compaction(core.arena);
  const { pool, heads } = watches;
  for (let literal = 2; literal < core.variables * 2 + 2; literal += 1) {
    const head = literal * HEAD + WATCHES;
    const begin = heads[head]!;
    const end = begin + heads[head + SIZE_WORD]!;
    let to = begin;
    for (let from = begin; from < end; from += 2) {
      const clause = compaction.moved(pool[from]!);
      if (clause === DELETED) continue;
      pool[to] = clause;
      pool[to + 1] = pool[from + 1]!;
      to += 2;
    }
    heads[head + SIZE_WORD] = to - begin;
  }
  for (let index = 0; index < core.trailSize; index += 1) {
    const place = trail[index]! | 1;
    const reason = origins[place]!;
    if (reason >= 0) origins[place] = compaction.moved(reason);
  }
  core.given = movedAll(core.given, compaction);
  core.learned = movedAll(core.learned, compaction);
}

function movedAll(clauses: readonly number[], compaction: Compaction): number[] {
  const moved: number[] = [];
  for (const clause of clauses) {
    const place = compaction.moved(clause);
    if (place !== DELETED) moved.push(place);
  }
  return moved;
}
