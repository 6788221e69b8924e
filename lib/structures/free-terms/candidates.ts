/** Structures of free terms that may satisfy sentences, made of what the sentences say of constructors. */
import { type RecursionRecord, readTerms, type TermsRecord } from "../../carriers/free-terms.ts";
import type { RelationSymbol } from "../../logic/formula.ts";
import {
  atomTerms,
  type Growth,
  partsOf,
  substitute,
  type TermFormulaRecord,
  type TermRecord,
  termFunctions,
  withParts,
} from "../../logic/records/formulas.ts";
import { junction } from "../../logic/records/made-formulas.ts";
import { type Bound, othersOf, renameConstructors, type Wanted } from "./bounds.ts";

/** Constructors that may be left out, all sets of which are tried. */
const MOST_OPTIONAL = 4;

/**
 * Where a relation holds of a constructor's values: where it must by the lower bounds, or where it may by the upper ones.
 * Where nothing is said, `lowest` is nowhere, `highest` everywhere, `itself` at the value itself alone, `others`
 * everywhere but there.
 */
type Manner = "lowest" | "highest" | "itself" | "others";
const MANNERS: readonly Manner[] = ["lowest", "highest", "itself", "others"];

/** Candidates, those with few constructors first. */
export function* candidates(
  wanted: readonly Wanted[],
  relations: readonly RelationSymbol[],
  growth: Growth,
): Generator<TermsRecord> {
  const places = choices(relations.map((relation) => placesOfRecursion(relation, wanted)));
  const seen = new Set<string>();
  const manners = choices(relations.map(({ places: count }) => (count > 1 ? MANNERS : MANNERS.slice(0, 2))));
  for (const constructors of constructorSets(wanted)) {
    for (const on of places) {
      for (const manner of manners) {
        const record = readTerms(recordOf(constructors, relations, on, manner, growth));
        const text = JSON.stringify(record);
        if (record !== null && !seen.has(text)) yield record;
        seen.add(text);
      }
    }
  }
}

/**
 * Sets of constructors with a constant and one that has arguments, the smallest first. One with arguments of which it is
 * said where just a relation holds of its values is always among them.
 */
function* constructorSets(wanted: readonly Wanted[]): Generator<readonly Wanted[]> {
  const isNeeded = ({ args, bounds }: Wanted) =>
    args.length > 0 && bounds.some((one) => isExact(one, bounds));
  const optional = wanted.filter((one) => one.bounds.length > 0 && !isNeeded(one));
  const sets =
    optional.length <= MOST_OPTIONAL
      ? choices(optional.map((one) => [[], [one]])).map((set) => set.flat())
      : [[], optional];
  for (const set of [...sets, wanted].sort((a, b) => a.length - b.length)) {
    const chosen = wanted.filter((one) => isNeeded(one) || set.includes(one));
    if (chosen.every(({ args }) => args.length === 0)) continue;
    const hasConstant = chosen.some(({ args }) => args.length === 0);
    yield hasConstant ? chosen : [{ name: "constant", args: [], bounds: [] }, ...chosen];
  }
}

/** Whether a bound has one for the other side. */
function isExact(bound: Bound, all: readonly Bound[]): boolean {
  return all.some(
    ({ relation, on, side }) => relation === bound.relation && on === bound.on && side !== bound.side,
  );
}

/** Names that read well, by those that the constructors have. */
function namesFor(constructors: readonly Wanted[]): ReadonlyMap<string, string> {
  const names = new Map<string, string>();
  for (const isConstant of [true, false]) {
    const letters = isConstant ? "cde" : "fgh";
    const some = constructors.filter(({ args }) => (args.length === 0) === isConstant);
    for (const [place, { name }] of some.entries())
      names.set(name, letters[place] ?? `${letters[0]}${place - letters.length + 1}`);
  }
  return names;
}

/** The places at which values of constructors stand in what is said of a relation; else its last one. */
function placesOfRecursion({ name, places }: RelationSymbol, wanted: readonly Wanted[]): readonly number[] {
  const found = wanted.flatMap(({ bounds }) => bounds).filter(({ relation }) => relation === name);
  const all = [...new Set(found.map(({ on }) => on))].sort((a, b) => b - a);
  return all.length > 0 ? all : [places - 1];
}

/** All ways to choose one of each list, in order. */
function choices<Option>(lists: readonly (readonly Option[])[]): readonly (readonly Option[])[] {
  return lists.reduce<readonly (readonly Option[])[]>(
    (chosen, list) => chosen.flatMap((before) => list.map((option) => [...before, option])),
    [[]],
  );
}

/** The record of the constructors and of what is said of them. What makes no definition there is left out. */
function recordOf(
  constructors: readonly Wanted[],
  relations: readonly RelationSymbol[],
  on: readonly number[],
  manner: readonly Manner[],
  growth: Growth,
): TermsRecord {
  const names = namesFor(constructors);
  const args = new Map(constructors.map((one) => [names.get(one.name)!, one.args]));
  const cases = new Map(relations.map(({ name }) => [name, new Map<string, TermFormulaRecord>()]));
  for (const one of constructors) {
    const symbol = names.get(one.name)!;
    for (const [index, { name, places }] of relations.entries()) {
      const bounds = one.bounds.flatMap((bound): Bound[] => {
        if (bound.relation !== name || bound.on !== on[index] || !isNamed(bound.formula)) return [];
        const formula = unfold(renameConstructors(bound.formula, names, growth), one.args);
        return formula === null ? [] : [{ ...bound, formula }];
      });
      const body = caseOf(bounds, manner[index]!, [symbol, ...one.args], othersOf(places));
      cases.get(name)!.set(symbol, body);
    }
  }
  const records = relations.map(({ name, places }, index): [string, RecursionRecord] => [
    name,
    { on: on[index]!, others: othersOf(places), cases: Object.fromEntries(cases.get(name)!) },
  ]);
  return { constructors: Object.fromEntries(args), relations: Object.fromEntries(records) };

  /** Whether all constructors that a formula speaks of are among these. */
  function isNamed(formula: TermFormulaRecord): boolean {
    if (formula[0] !== "is" && formula[0] !== "=") return partsOf(formula).every(isNamed);
    return atomTerms(formula)
      .flatMap(termFunctions)
      .every((name) => names.has(name));
  }

  /**
   * The formula with relations at values of constructors before this one unfolded; null when there are others that are
   * not at arguments of it.
   */
  function unfold(formula: TermFormulaRecord, own: readonly string[]): TermFormulaRecord | null {
    growth.add();
    if (formula[0] === "=") return formula;
    if (formula[0] !== "is") {
      const parts = partsOf(formula).map((part) => unfold(part, own));
      return parts.includes(null) ? null : withParts(formula, parts as TermFormulaRecord[]);
    }
    const [, name, ...terms] = formula;
    const place = on[relations.findIndex((relation) => relation.name === name)]!;
    const value = terms[place]!;
    if (typeof value === "string") return own.includes(value) ? formula : null;
    const [symbol, ...inner] = value;
    const body = cases.get(name)!.get(symbol);
    if (body === undefined) return null;
    const rest = terms.toSpliced(place, 1);
    const values = new Map<string, TermRecord>([
      ...othersOf(terms.length).map((other, index) => [other, rest[index]!] as const),
      ...args.get(symbol)!.map((arg, index) => [arg, inner[index]!] as const),
    ]);
    return unfold(substitute(body, values, growth), own);
  }
}

function caseOf(
  bounds: readonly Bound[],
  manner: Manner,
  value: TermRecord,
  others: readonly string[],
): TermFormulaRecord {
  if (bounds.length === 0) {
    if (manner === "lowest" || manner === "highest") return [manner === "lowest" ? "false" : "true"];
    const itself = junction(
      "and",
      others.map((other) => ["=", other, value]),
    );
    return manner === "itself" ? itself : ["not", itself];
  }
  const side = manner === "highest" || manner === "others" ? "upper" : "lower";
  const said = bounds.filter((bound) => bound.side === side).map(({ formula }) => formula);
  const different = new Map(said.map((formula) => [JSON.stringify(formula), formula]));
  return junction(side === "lower" ? "or" : "and", [...different.values()]);
}
