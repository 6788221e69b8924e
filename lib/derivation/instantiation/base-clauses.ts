/** What instances are made of: the input clauses, and clauses that say what identity is. */

import type { ClauseRecord, TermRecord } from "../../evidence/format.ts";
import { atomOf, atomTerms } from "../../logic/records/formulas.ts";
import { clauseVariables } from "../lines.ts";
import type { InputClause } from "../refutation.ts";

/** A clause that instances are made of. */
export interface BaseClause {
  readonly record: ClauseRecord;
  /** Names of its variables; in terms they are 0, 1, … in this order. */
  readonly variables: readonly string[];
  /** Its place among the input clauses; null when it is true by the laws of identity. */
  readonly input: number | null;
  readonly goal: boolean;
}

/** Calls `see` with the name and number of arguments of each function, constants included, wherever one occurs. */
export function eachFunction(
  clauses: readonly ClauseRecord[],
  see: (name: string, args: number) => void,
): void {
  const visit = (term: TermRecord): void => {
    if (typeof term === "string") return;
    see(term[0], term.length - 1);
    for (const arg of term.slice(1) as TermRecord[]) visit(arg);
  };
  for (const clause of clauses) for (const literal of clause) atomTerms(atomOf(literal)).forEach(visit);
}

/** Clauses that say what identity is, for the relations and functions of some clauses. */
export function identityClauses(clauses: readonly ClauseRecord[]): readonly ClauseRecord[] {
  const relations = new Map<string, number>();
  const functions = new Map<string, number>();
  eachFunction(clauses, (name, args) => {
    functions.set(name, args);
  });
  let isUsed = false;
  for (const clause of clauses)
    for (const literal of clause) {
      const atom = atomOf(literal);
      if (atom[0] === "=") isUsed = true;
      else relations.set(`${atom[1]}/${atom.length - 2}`, atom.length - 2);
    }
  if (!isUsed) return [];
  const differs: ClauseRecord[number] = ["not", ["=", "x", "y"]];
  const args = (count: number, place: number, value: string) =>
    Array.from({ length: count }, (_, other) => (other === place ? value : `z${other}`));
  const result: ClauseRecord[] = [
    [["=", "x", "x"]],
    [differs, ["=", "y", "x"]],
    [differs, ["not", ["=", "y", "z"]], ["=", "x", "z"]],
  ];
  for (const [key, count] of relations)
    for (let place = 0; place < count; place += 1) {
      const name = key.slice(0, key.lastIndexOf("/"));
      result.push([
        differs,
        ["not", ["is", name, ...args(count, place, "x")]],
        ["is", name, ...args(count, place, "y")],
      ]);
    }
  for (const [name, count] of functions)
    for (let place = 0; place < count; place += 1)
      result.push([differs, ["=", [name, ...args(count, place, "x")], [name, ...args(count, place, "y")]]]);
  return result;
}

/** What base clauses are made of: the input, and what identity is. */
export function baseClauses(input: readonly InputClause[]): readonly BaseClause[] {
  const given = input.map(({ clause, goal }, place) => ({ record: clause, input: place, goal }));
  const identity = identityClauses(input.map(({ clause }) => clause)).map((record) => ({
    record,
    input: null,
    goal: false,
  }));
  return [...given, ...identity].map((base) => ({ ...base, variables: clauseVariables(base.record) }));
}
