/** Conjunctions and disjunctions of very many parts. */
import type { Formula } from "../logic/formula.ts";

/** Joins in portions: a call with more than about 100,000 arguments would overflow the stack. */
export function joined(join: (...parts: Formula[]) => Formula, parts: readonly Formula[]): Formula {
  const portion = 10_000;
  if (parts.length <= portion) return join(...parts);
  const portions: Formula[] = [];
  for (let at = 0; at < parts.length; at += portion) portions.push(join(...parts.slice(at, at + portion)));
  return join(...portions);
}
