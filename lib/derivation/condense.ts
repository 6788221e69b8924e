/**
 * Condensed clauses (Joyner 1976): a clause that says the same as an instance of itself with fewer literals is
 * replaced by that. Clause forms of "there is one, and for each of them …" give such clauses, and resolution would
 * drag their extra literals along.
 */

import type { ClauseRecord, LiteralRecord, TermRecord } from "../evidence/format.ts";
import { atomOf, atomTerms, substituteInClause } from "../logic/records/formulas.ts";
import { literalText, type Substitution } from "./lines.ts";

/** Attempts to match a literal, for one clause, after which what was found is taken. */
const MOST_ATTEMPTS = 2_000;
/** Longer clauses are left as they are. */
const MOST_LITERALS = 40;

/** A clause that is a part of another, and what put for the other's variables makes it that. */
export interface Condensed {
  readonly clause: ClauseRecord;
  readonly terms: Substitution;
}

/** As small a part of a clause as is an instance of it, and was found; null when that is the clause itself. */
export function condense(clause: ClauseRecord): Condensed | null {
  let attempts = 0;
  let least = clause.length;
  let found: Substitution | null = null;
  const extend = (place: number, terms: Substitution, image: ReadonlySet<LiteralRecord>): void => {
    if (image.size >= least || attempts > MOST_ATTEMPTS) return;
    if (place === clause.length) {
      least = image.size;
      found = terms;
      return;
    }
    // Literals already there come first: the fewer, the better.
    const targets = [...image, ...clause.filter((literal) => !image.has(literal))];
    for (const target of targets) {
      attempts += 1;
      const matched = matchLiteral(clause[place]!, target, terms);
      if (matched !== null) extend(place + 1, matched, new Set(image).add(target));
    }
  };
  if (clause.length <= MOST_LITERALS) extend(0, new Map(), new Set());
  if (found === null) return null;
  const terms: Substitution = found;
  const image = new Set(substituteInClause(clause, terms).map(literalText));
  return { clause: clause.filter((literal) => image.has(literalText(literal))), terms };
}

/** The terms extended so that they make the first literal the second, whose variables are as constants. */
function matchLiteral(
  pattern: LiteralRecord,
  literal: LiteralRecord,
  terms: Substitution,
): Substitution | null {
  const left = atomOf(pattern);
  const right = atomOf(literal);
  const isSameKind = (pattern === left) === (literal === right) && left[0] === right[0];
  if (!isSameKind || left.length !== right.length || (left[0] === "is" && left[1] !== right[1])) return null;
  const extended = new Map(terms);
  const places = atomTerms(right);
  return atomTerms(left).every((term, place) => matchTerm(term, places[place]!, extended)) ? extended : null;
}

function matchTerm(pattern: TermRecord, term: TermRecord, terms: Map<string, TermRecord>): boolean {
  if (typeof pattern === "string") {
    const known = terms.get(pattern);
    if (known !== undefined) return JSON.stringify(known) === JSON.stringify(term);
    terms.set(pattern, term);
    return true;
  }
  if (typeof term === "string" || pattern[0] !== term[0] || pattern.length !== term.length) return false;
  return pattern
    .slice(1)
    .every((arg, place) => matchTerm(arg as TermRecord, term[place + 1] as TermRecord, terms));
}
