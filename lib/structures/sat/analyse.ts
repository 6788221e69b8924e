import { HEADER, LEVELS_WORD } from "./arena.ts";
import { type Core, literalOfReason, NONE } from "./core.ts";

/*
 * ┌──────────────────────────────────────────────────────────────────────────────────────────────────────────────┐
 * │ analyse: learns a clause from a conflict, by resolving up to the first unique implication point of the current │
 * │ level (Marques-Silva & Sakallah 1999; Zhang, Madigan, Moskewicz & Malik 2001), without the literals that the   │
 * │ others imply (Sörensson & Biere 2009).                                                                         │
 * │                                                                                                                │
 * │ Before: all literals of the conflict are false, at least one of them since the current level, which is above   │
 * │ 0 and began with a decision.                                                                                   │
 * │ After: `clause` holds the learned clause, which follows from the kept clauses; its first literal is the only   │
 * │ one of the current level, its second is of the level that is returned: below that level there is nothing the   │
 * │ clause would add. `clauseLevels` is set; activities have been raised; nothing has been taken back.             │
 * └──────────────────────────────────────────────────────────────────────────────────────────────────────────────┘
 */
export function analyse(core: Core, conflict: number): number {
  const { seen, origins, trail, clause, marked, level } = core;
  const { words } = core.arena;
  let markedSize = 0;
  let size = 1;
  let open = 0;
  let index = core.trailSize - 1;
  let reason = conflict;
  // The literal that the reason implies; the conflict implies none.
  let implied = -1;

  for (;;) {
    if (reason >= 0) {
      if (words[reason + LEVELS_WORD] !== 0) {
        core.bumpClause(reason);
        renewLevels(core, reason);
      }
      const from = reason + HEADER + (implied < 0 ? 0 : 1);
      const stop = reason + HEADER + words[reason]!;
      for (let at = from; at < stop; at += 1) {
        const literal = words[at]!;
        const variable = literal >> 1;
        const assigned = origins[literal & -2]!;
        if (seen[variable] !== 0 || assigned === 0) continue;
        seen[variable] = 1;
        marked[markedSize++] = variable;
        core.bump(variable);
        if (assigned >= level) open += 1;
        else clause[size++] = literal;
      }
    } else {
      let literal = literalOfReason(reason);
      for (let times = implied < 0 ? 2 : 1; times > 0; times -= 1, literal = core.conflictLiteral) {
        const variable = literal >> 1;
        const assigned = origins[literal & -2]!;
        if (seen[variable] !== 0 || assigned === 0) continue;
        seen[variable] = 1;
        marked[markedSize++] = variable;
        core.bump(variable);
        if (assigned >= level) open += 1;
        else clause[size++] = literal;
      }
    }
    while (seen[trail[index]! >> 1] === 0) index -= 1;
    implied = trail[index]!;
    index -= 1;
    open -= 1;
    if (open === 0) break;
    reason = origins[implied | 1]!;
  }
  clause[0] = implied ^ 1;
  core.clauseSize = size;
  markedSize = minimise(core, markedSize);
  for (let at = 0; at < markedSize; at += 1) seen[marked[at]!] = 0;
  core.clauseLevels = countLevels(core, clause, 0, core.clauseSize);
  return arrangeSecond(core);
}

/** Takes out of `clause` the literals that the others imply, by the reasons of their level and lower ones. */
function minimise(core: Core, markedBefore: number): number {
  const { clause, origins } = core;
  let mask = 0;
  for (let at = 1; at < core.clauseSize; at += 1) mask |= 1 << (origins[clause[at]! & -2]! & 31);
  let markedSize = markedBefore;
  let kept = 1;
  for (let at = 1; at < core.clauseSize; at += 1) {
    const literal = clause[at]!;
    if (origins[literal | 1] !== NONE) {
      const after = redundant(core, literal, mask, markedSize);
      if (after >= 0) {
        markedSize = after;
        continue;
      }
      markedSize = ~after;
    }
    clause[kept++] = literal;
  }
  core.clauseSize = kept;
  return markedSize;
}

/** Mark of {@link Core.seen} beside 1, which is: in the learned clause, or implied by it. */
const NOT_IMPLIED = 2;

/**
 * Whether a literal is implied by others of the learned clause: whether every way back through the reasons ends in it.
 * `mask` has a bit for every level in it, modulo 32: a literal of another level cannot be implied. All literals that
 * are settled on the way are marked, implied or not, so that no part of the graph is looked at twice for one clause.
 * Returns the number of marked variables; its complement if the literal is not implied.
 */
function redundant(core: Core, literal: number, mask: number, markedBefore: number): number {
  const { seen, origins, marked, stack } = core;
  const { words } = core.arena;
  let markedSize = markedBefore;
  // The way from the literal to where we are: at 2i a literal, at 2i + 1 how many of its reason's have been settled.
  let top = 0;
  stack[0] = literal;
  stack[1] = 0;
  for (;;) {
    const reason = origins[stack[top]! | 1]!;
    const settled = stack[top + 1]!;
    const count = reason >= 0 ? words[reason]! - 1 : 1;
    if (settled === count) {
      const variable = stack[top]! >> 1;
      if (seen[variable] === 0) {
        seen[variable] = 1;
        marked[markedSize++] = variable;
      }
      if (top === 0) return markedSize;
      top -= 2;
      continue;
    }
    stack[top + 1] = settled + 1;
    const other = reason >= 0 ? words[reason + HEADER + 1 + settled]! : literalOfReason(reason);
    const variable = other >> 1;
    if (seen[variable] === 1 || origins[other & -2] === 0) continue;
    if (
      seen[variable] === NOT_IMPLIED ||
      origins[other | 1] === NONE ||
      (mask & (1 << (origins[other & -2]! & 31))) === 0
    ) {
      if (seen[variable] === 0) {
        seen[variable] = NOT_IMPLIED;
        marked[markedSize++] = variable;
      }
      // Nothing on the way here is implied; what has been settled beside it stays.
      for (let place = top; place > 0; place -= 2) {
        const passed = stack[place]! >> 1;
        if (seen[passed] !== 0) continue;
        seen[passed] = NOT_IMPLIED;
        marked[markedSize++] = passed;
      }
      return ~markedSize;
    }
    top += 2;
    stack[top] = other;
    stack[top + 1] = 0;
  }
}

/** How many decision levels the literals span (the "literal block distance" of Audemard & Simon 2009). */
function countLevels(core: Core, literals: Int32Array, from: number, length: number): number {
  const { origins, stamps } = core;
  core.stamp += 1;
  const { stamp } = core;
  let count = 0;
  for (let at = from; at < from + length; at += 1) {
    const level = origins[literals[at]! & -2]!;
    if (stamps[level] === stamp) continue;
    stamps[level] = stamp;
    count += 1;
  }
  return count;
}

/** Notes that a learned clause, all of whose literals are assigned, spans fewer levels than it did. */
function renewLevels(core: Core, clause: number): void {
  const { words } = core.arena;
  const before = words[clause + LEVELS_WORD]!;
  if (before <= 2) return;
  const levels = countLevels(core, words, clause + HEADER, words[clause]!);
  if (levels < before) words[clause + LEVELS_WORD] = levels;
}

/** Puts a literal of the highest level among all but the first second; returns its level, 0 if there is none. */
function arrangeSecond(core: Core): number {
  const { clause, clauseSize, origins } = core;
  if (clauseSize === 1) return 0;
  let highest = 1;
  for (let at = 2; at < clauseSize; at += 1)
    if (origins[clause[at]! & -2]! > origins[clause[highest]! & -2]!) highest = at;
  const literal = clause[highest]!;
  clause[highest] = clause[1]!;
  clause[1] = literal;
  return origins[literal & -2]!;
}

/**
 * The assumptions among the decisions that made a literal false, and the literal's own negation: together they cannot
 * hold. Packed.
 */
export function blame(core: Core, assumption: number): number[] {
  const { seen, origins, trail } = core;
  const { words } = core.arena;
  const found = [assumption];
  if (origins[assumption & -2] === 0) return found;
  seen[assumption >> 1] = 1;
  for (let index = core.trailSize - 1; index >= core.limits[1]!; index -= 1) {
    const literal = trail[index]!;
    const variable = literal >> 1;
    if (seen[variable] === 0) continue;
    seen[variable] = 0;
    const reason = origins[literal | 1]!;
    if (reason === NONE) found.push(literal);
    else if (reason < 0) markAbove(core, literalOfReason(reason));
    else
      for (let at = reason + HEADER + 1; at < reason + HEADER + words[reason]!; at += 1)
        markAbove(core, words[at]!);
  }
  seen[assumption >> 1] = 0;
  return found;
}

function markAbove(core: Core, literal: number): void {
  if (core.origins[literal & -2]! > 0) core.seen[literal >> 1] = 1;
}
