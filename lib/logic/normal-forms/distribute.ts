/** Distribution of one junction over the other, for formulas without quantifiers. */
import type { Literal, TermFormula } from "../clausal.ts";
import { literalKey, literalOf, termKey } from "../clausal-formulas.ts";
import { FormTooLarge, type Limits } from "./result.ts";

/** Literals without repetition, by {@link literalKey}. */
type LiteralSet = ReadonlyMap<string, Literal>;

/**
 * The sets of literals whose disjunctions make up a quantifier-free formula in negation normal form when taken
 * together (`and`), or whose conjunctions do when taken apart (`or`). Sets with a literal and its negation are left
 * out, and of several that include one another only the smallest are kept.
 * @param outer the junction of the sets
 * @throws FormTooLarge when there would be more literals than allowed
 */
export function distribute(
  outer: "and" | "or",
  formula: TermFormula,
  limits: Limits,
): readonly (readonly Literal[])[] {
  return setsOf(outer, formula, limits).map((set) => [...set.values()]);
}

/** Whether a formula is a junction of junctions of the other kind of just these literals. */
export function isDistributed(
  outer: "and" | "or",
  formula: TermFormula,
  sets: readonly (readonly Literal[])[],
): boolean {
  const inner = outer === "and" ? "or" : "and";
  const groups = formula.kind === outer ? formula.parts : [formula];
  if (groups.length !== sets.length) return false;
  return groups.every((group, index) => {
    const parts = group.kind === inner ? group.parts : [group];
    return parts.length === sets[index]!.length && parts.every((part) => literalOf(part) !== null);
  });
}

function setsOf(outer: "and" | "or", formula: TermFormula, limits: Limits): readonly LiteralSet[] {
  const literal = literalOf(formula);
  if (literal !== null) {
    const { atom, positive } = literal;
    if (atom.kind !== "equal" || termKey(atom.left) !== termKey(atom.right))
      return [new Map([[literalKey(literal), literal]])];
    // t = t is true: it makes a disjunction true and adds nothing to a conjunction; t ≠ t likewise the other way.
    return positive === (outer === "and") ? [] : [new Map()];
  }
  switch (formula.kind) {
    case "true":
    case "false":
      return (formula.kind === "true") === (outer === "and") ? [] : [new Map()];
    case "and":
    case "or": {
      const parts: readonly (readonly LiteralSet[])[] = formula.parts.map((part) =>
        setsOf(outer, part, limits),
      );
      if (formula.kind === outer) return reduced(parts.flat(), limits);
      return parts.reduce<readonly LiteralSet[]>((sets, more) => crossed(sets, more, limits), [new Map()]);
    }
    default:
      throw new Error(`no negation normal form without quantifiers: ${formula.kind}`);
  }
}

function crossed(
  left: readonly LiteralSet[],
  right: readonly LiteralSet[],
  limits: Limits,
): readonly LiteralSet[] {
  if (left.length === 1 && left[0]!.size === 0) return right;
  const sets: LiteralSet[] = [];
  let literals = 0;
  for (const one of left)
    for (const other of right) {
      const set = union(one, other);
      if (set === null) continue;
      literals += set.size;
      if (literals > limits.parts) throw new FormTooLarge("parts", limits.parts);
      sets.push(set);
    }
  return reduced(sets, limits);
}

/** Null when a literal and its negation come together. */
function union(left: LiteralSet, right: LiteralSet): LiteralSet | null {
  const set = new Map(left);
  for (const [key, literal] of right) {
    if (left.has((literal.positive ? "-" : "+") + key.slice(1))) return null;
    set.set(key, literal);
  }
  return set;
}

/** Sets are compared pairwise only where there are at most so many; of more, only equal ones are removed. */
const MOST_COMPARED = 500;

/** Without repeated sets and those that include another. The order is kept. */
function reduced(sets: readonly LiteralSet[], limits: Limits): readonly LiteralSet[] {
  const distinct = new Map<string, LiteralSet>();
  let literals = 0;
  for (const set of sets) {
    const key = [...set.keys()].sort().join(" ");
    if (distinct.has(key)) continue;
    distinct.set(key, set);
    literals += set.size;
    if (literals > limits.parts) throw new FormTooLarge("parts", limits.parts);
  }
  const kept = [...distinct.values()];
  if (kept.length > MOST_COMPARED) return kept;
  return kept.filter(
    (set) => !kept.some((other) => other !== set && other.size < set.size && includes(set, other)),
  );
}

function includes(set: LiteralSet, other: LiteralSet): boolean {
  for (const key of other.keys()) if (!set.has(key)) return false;
  return true;
}
