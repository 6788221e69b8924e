/**
 * Derivations shortened for reading: what is not needed goes, as do lines that repeat another one or merely put terms in
 * place of its variables, and lines on the way to a shorter one that is seen at once.
 */

import type { ClauseRecord, TermRecord } from "../evidence/format.ts";
import { substituteInClause, substituteInTerm } from "../logic/records/formulas.ts";
import {
  addVariables,
  clauseVariables,
  compose,
  followsByPropagation,
  type Line,
  literalText,
  orderByNeed,
  type Use,
  usedClause,
  usesOf,
} from "./lines.ts";

/** Lines that one step may use after a line on the way to it was dropped. */
const MOST_USES = 3;

/** @param lines the last one is what is derived */
export function shorten(lines: readonly Line[]): readonly Line[] {
  let result = orderByNeed(lines);
  for (let before = result.length + 1; result.length < before; ) {
    before = result.length;
    result = orderByNeed(dropSteps(dropInstances(mergeVariants(result))));
  }
  return renameVariables(result);
}

/** Lets the first of lines that are the same, up to names of variables, stand for all of them. */
function mergeVariants(lines: readonly Line[]): readonly Line[] {
  const first = new Map<string, { line: number; variables: readonly string[] }>();
  /** By line: what to use instead. */
  const instead: Use[] = [];
  const result = lines.map((line, place): Line => {
    const changed = mapUses(line, (use) => through(lines, use, instead[use.line]!));
    const { text, variables } = canonical(line.clause);
    const known = first.get(text);
    if (known === undefined) {
      first.set(text, { line: place, variables });
      instead.push({ line: place, terms: new Map() });
    } else
      instead.push({
        line: known.line,
        terms: new Map(known.variables.map((variable, index) => [variable, variables[index]!])),
      });
    return changed;
  });
  // If the empty clause came earlier, that is where the derivation ends.
  const last = instead.at(-1)!.line;
  return result.slice(0, last + 1);
}

/** A clause with its literals in a fixed order and variables named in the order they then occur. */
function canonical(clause: ClauseRecord): { text: string; variables: readonly string[] } {
  const shape = new Map(
    clause.map((literal) => [literal, literalText(literal).replace(/"[a-z][0-9]*'*"/g, '"x"')]),
  );
  const sorted = [...clause].sort((a, b) => (shape.get(a)! < shape.get(b)! ? -1 : 1));
  const variables = clauseVariables(sorted);
  const names = new Map(variables.map((variable, index) => [variable, `v${index}`]));
  const text = substituteInClause(sorted, names).map(literalText).join();
  return { text, variables };
}

/** Drops lines that follow from a single one: they are instances of it. */
function dropInstances(lines: readonly Line[]): readonly Line[] {
  const instead: Use[] = [];
  return lines.map((line, place): Line => {
    const changed = mapUses(line, (use) => through(lines, use, instead[use.line]!));
    const uses = usesOf(changed);
    const isInstance = uses.length === 1 && place < lines.length - 1;
    instead.push(isInstance ? uses[0]! : { line: place, terms: new Map() });
    return changed;
  });
}

/** Drops lines that one other uses, if that gives a shorter clause and still has few uses. */
function dropSteps(lines: readonly Line[]): readonly Line[] {
  const users = new Int32Array(lines.length);
  for (const line of lines) for (const { line: used } of usesOf(line)) users[used]! += 1;
  const result = [...lines];
  lines.forEach((_, place) => {
    for (let next = 0; next < usesOf(result[place]!).length; ) {
      const line = result[place]!;
      const uses = usesOf(line);
      const use = uses[next]!;
      const step = result[use.line]!;
      const between = usesOf(step);
      next += 1;
      if (
        users[use.line] !== 1 ||
        between.length === 0 ||
        between.length + uses.length - 1 > MOST_USES ||
        step.clause.length <= line.clause.length
      )
        continue;
      const joined = uses.flatMap((other) =>
        other === use ? between.map((earlier) => through(result, use, earlier)) : [other],
      );
      const premises = joined.map((other) => usedClause(result, other));
      if (!followsByPropagation(line.clause, premises)) continue;
      result[place] = { why: "infer", clause: line.clause, uses: joined };
      next = 0;
    }
  });
  return result;
}

/** A use of a line, as a use of another of which the line is an instance or a consequence. */
function through(lines: readonly Line[], use: Use, other: Use): Use {
  if (other.line === use.line) return use;
  return {
    line: other.line,
    terms: compose(clauseVariables(lines[other.line]!.clause), other.terms, use.terms),
  };
}

function mapUses(line: Line, change: (use: Use) => Use): Line {
  if (line.why !== "infer") return line;
  const uses = new Map<string, Use>();
  for (const use of line.uses) {
    const changed = change(use);
    const text = JSON.stringify([changed.line, ...changed.terms]);
    if (!uses.has(text)) uses.set(text, changed);
  }
  return { ...line, uses: [...uses.values()] };
}

/** Calls the variables of each line x, y, z, … in the order they occur; those of clause forms stay. */
function renameVariables(lines: readonly Line[]): readonly Line[] {
  const renamings: ReadonlyMap<string, string>[] = [];
  return lines.map((line): Line => {
    if (line.why === "clause") {
      renamings.push(new Map());
      return line;
    }
    const found = new Set(clauseVariables(line.clause));
    for (const { line: used, terms } of usesOf(line))
      for (const variable of clauseVariables(lines[used]!.clause))
        addVariables(terms.get(variable) ?? variable, found);
    const names = new Map([...found].map((variable, index) => [variable, variableName(index)]));
    renamings.push(names);
    const clause = substituteInClause(line.clause, names);
    if (line.why === "identity") return { ...line, clause };
    const uses = line.uses.map(({ line: used, terms }): Use => {
      const renaming = renamings[used]!;
      const renamed = clauseVariables(lines[used]!.clause).map((variable): [string, TermRecord] => [
        renaming.get(variable) ?? variable,
        substituteInTerm(terms.get(variable) ?? variable, names),
      ]);
      return { line: used, terms: new Map(renamed.filter(([variable, term]) => variable !== term)) };
    });
    return { why: "infer", clause, uses };
  });
}

const LETTERS = "xyzuvw";

function variableName(index: number): string {
  const round = Math.floor(index / LETTERS.length);
  return LETTERS[index % LETTERS.length]! + (round === 0 ? "" : round);
}
