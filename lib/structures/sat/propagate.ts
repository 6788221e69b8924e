import { HEADER } from "./arena.ts";
import { type Core, NONE, twoLiteralReason } from "./core.ts";
import { HEAD, ROOM_WORD, SIZE_WORD, WATCHES } from "./watches.ts";

/** The meter is told of work after this many visits. */
const REPORT_AFTER = 4096;

/*
 * ┌──────────────────────────────────────────────────────────────────────────────────────────────────────────────┐
 * │ propagate: unit propagation by two watched literals (Moskewicz, Madigan, Zhao, Zhang & Malik 2001).            │
 * │                                                                                                                │
 * │ Before: every clause of the arena is watched at its first two literals, in the lists of their negations. For   │
 * │ every clause, a watched literal that is false before `head` on the trail has a true literal beside it that     │
 * │ was not assigned at a higher level.                                                                            │
 * │ After: the same. Either `head` has reached the end of the trail, nothing is left to propagate, and the result  │
 * │ is NONE; or the result is a conflict, all of whose literals are false; or the meter has ended the search:      │
 * │ then `stopped` is set, the result is NONE, and what is left is propagated at the next call.                    │
 * │ A clause that is a reason has the literal that it implies first.                                               │
 * └──────────────────────────────────────────────────────────────────────────────────────────────────────────────┘
 */
export function propagate(core: Core): number {
  const { values, origins, trail, level, watches } = core;
  const { words } = core.arena;
  const { heads } = watches;
  let { pool } = watches;
  let { trailSize, head: queue, visits } = core;
  const before = queue;
  let conflict = NONE;

  while (queue < trailSize && conflict === NONE) {
    if (visits - core.reported >= REPORT_AFTER) {
      core.visits = visits;
      if (!core.report()) break;
    }
    const literal = trail[queue]!;
    const falsified = literal ^ 1;
    queue += 1;

    const impliedHead = literal * HEAD;
    const impliedStart = heads[impliedHead]!;
    const impliedEnd = impliedStart + heads[impliedHead + SIZE_WORD]!;
    visits += 1 + impliedEnd - impliedStart;
    for (let at = impliedStart; at < impliedEnd; at += 1) {
      const other = pool[at]!;
      const value = values[other]!;
      if (value > 0) continue;
      if (value < 0) {
        conflict = twoLiteralReason(falsified);
        core.conflictLiteral = other;
        break;
      }
      values[other] = 1;
      values[other ^ 1] = -1;
      origins[other & -2] = level;
      origins[other | 1] = twoLiteralReason(falsified);
      trail[trailSize] = other;
      trailSize += 1;
    }
    if (conflict !== NONE) break;

    // Entries that stay are moved down from `from` to `to`.
    const head = impliedHead + WATCHES;
    let from = heads[head]!;
    let to = from;
    let end = from + heads[head + SIZE_WORD]!;
    visits += (end - from) >> 1;
    scan: while (from < end) {
      const clause = pool[from]!;
      const blocker = pool[from + 1]!;
      from += 2;
      if (values[blocker]! > 0) {
        pool[to] = clause;
        pool[to + 1] = blocker;
        to += 2;
        continue;
      }
      const literals = clause + HEADER;
      const first = words[literals]! ^ words[literals + 1]! ^ falsified;
      const firstValue = values[first]!;
      if (firstValue > 0) {
        pool[to] = clause;
        pool[to + 1] = first;
        to += 2;
        continue;
      }
      const stop = literals + words[clause]!;
      for (let at = literals + 2; at < stop; at += 1) {
        const other = words[at]!;
        if (values[other]! < 0) continue;
        words[literals] = first;
        words[literals + 1] = other;
        words[at] = falsified;
        const list = (other ^ 1) * HEAD + WATCHES;
        const used = heads[list + SIZE_WORD]!;
        if (used < heads[list + ROOM_WORD]!) {
          const place = heads[list]! + used;
          pool[place] = clause;
          pool[place + 1] = first;
          heads[list + SIZE_WORD] = used + 2;
        } else {
          // The lists may move.
          const base = heads[head]!;
          watches.watch(other ^ 1, clause, first);
          pool = watches.pool;
          const shift = heads[head]! - base;
          from += shift;
          to += shift;
          end += shift;
        }
        continue scan;
      }
      pool[to] = clause;
      pool[to + 1] = first;
      to += 2;
      if (firstValue < 0) {
        conflict = clause;
        break;
      }
      words[literals] = first;
      words[literals + 1] = falsified;
      values[first] = 1;
      values[first ^ 1] = -1;
      origins[first & -2] = level;
      origins[first | 1] = clause;
      trail[trailSize] = first;
      trailSize += 1;
    }
    if (from !== to) {
      if (from < end) pool.copyWithin(to, from, end);
      heads[head + SIZE_WORD] = to + (end - from) - heads[head]!;
    }
  }

  core.visits = visits;
  core.propagations += queue - before;
  core.head = queue;
  core.trailSize = trailSize;
  return conflict;
}
