/** The lines of a derivation while it is put together: clauses, how they follow, and what can be asked of them. */

import type { ClauseRecord, LiteralRecord, TermRecord } from "../evidence/format.ts";
import { atomOf, atomTerms, substituteInClause, substituteInTerm } from "../logic/records/formulas.ts";

export type Substitution = ReadonlyMap<string, TermRecord>;

/** An earlier line by its place, and what stands in it for its variables. */
export interface Use {
  readonly line: number;
  readonly terms: Substitution;
}

/** Lines go by their place in a list; each uses earlier ones. */
export type Line = { readonly clause: ClauseRecord } & (
  | { readonly why: "clause"; readonly formula: number; readonly place: number }
  | { readonly why: "identity" }
  | { readonly why: "infer"; readonly uses: readonly Use[] }
);

export function usesOf(line: Line): readonly Use[] {
  return line.why === "infer" ? line.uses : [];
}

/** The variables of a clause, each once, in the order they occur. */
export function clauseVariables(clause: ClauseRecord): readonly string[] {
  const found = new Set<string>();
  for (const literal of clause) for (const term of atomTerms(atomOf(literal))) addVariables(term, found);
  return [...found];
}

/** Adds the variables of a term in the order they occur. */
export function addVariables(term: TermRecord, found: Set<string>): void {
  if (typeof term === "string") found.add(term);
  else for (const arg of term.slice(1)) addVariables(arg, found);
}

/** What a variable of a line becomes after a substitution in it and another in what that gave. */
export function compose(
  variables: readonly string[],
  first: Substitution,
  second: Substitution,
): Map<string, TermRecord> {
  return new Map(
    variables.map((variable) => [variable, substituteInTerm(first.get(variable) ?? variable, second)]),
  );
}

/** The needed lines in a new order: each just after those that it uses, which come in the order of their use. */
export function orderByNeed(lines: readonly Line[]): readonly Line[] {
  const ordered: Line[] = [];
  const places = new Map<number, number>();
  const visit = (start: number): void => {
    // A stack of its own: derivations may be long.
    const stack: { line: number; next: number }[] = [{ line: start, next: 0 }];
    for (let top = stack.at(-1); top !== undefined; top = stack.at(-1)) {
      const line = lines[top.line]!;
      const uses = usesOf(line);
      if (top.next < uses.length) {
        const used = uses[top.next]!.line;
        top.next += 1;
        if (!places.has(used)) stack.push({ line: used, next: 0 });
        continue;
      }
      stack.pop();
      places.set(top.line, ordered.length);
      ordered.push(
        line.why === "infer"
          ? { ...line, uses: uses.map((use) => ({ ...use, line: places.get(use.line)! })) }
          : line,
      );
    }
  };
  visit(lines.length - 1);
  return ordered;
}

/**
 * Whether a clause is a consequence of others by unit propagation, as the format of evidence means it. Variables count
 * as constants.
 */
export function followsByPropagation(clause: ClauseRecord, premises: readonly ClauseRecord[]): boolean {
  /** Texts of the literals assumed false. */
  const falsified = new Set(clause.map(literalText));
  const texts = premises.map((premise) => [...new Set(premise.map(literalText))]);
  for (let changed = true; changed; ) {
    changed = false;
    for (const literals of texts) {
      const left = literals.filter((literal) => !falsified.has(literal));
      if (left.length === 0) return true;
      if (left.length > 1) continue;
      const denial = oppositeText(left[0]!);
      if (falsified.has(denial)) continue;
      falsified.add(denial);
      changed = true;
    }
  }
  return false;
}

/** A text of a literal that begins with its sign. */
export function literalText(literal: LiteralRecord): string {
  return (literal[0] === "not" ? "-" : "+") + JSON.stringify(atomOf(literal));
}

function oppositeText(text: string): string {
  return (text[0] === "-" ? "+" : "-") + text.slice(1);
}

/** A line as it is used. */
export function usedClause(lines: readonly Line[], use: Use): ClauseRecord {
  return substituteInClause(lines[use.line]!.clause, use.terms);
}
