/**
 * The propositional form of "these sentences hold on n points", which a search for a proof that there is no such
 * structure and the checker of that proof start from.
 */

import type { Meter } from "../meter.ts";
import { atomTerms, type FormulaRecord, freeVariables, Growth, partsOf, visitAtoms } from "./formulas.ts";
import { miniscopeFormula } from "./made-formulas.ts";

/** Literals of a propositional form beyond which there is none. */
const LARGEST_GROUND_FORM = 10_000_000;

/** Clauses of signed literals, as in DIMACS. */
export interface GroundForm {
  readonly variables: number;
  readonly clauses: readonly (readonly number[])[];
}

/** Points, counted from 0, for variables. */
type Points = ReadonlyMap<string, number>;

/**
 * Clauses that can be satisfied if the sentences have a model on n points.
 *
 * The variables are numbered from 1: one for each tuple of points of each relation, relations by name and places,
 * tuples row by row; then one for each part of a sentence, with points for its variables, that a clause speaks of: it
 * implies the part (Plaisted & Greenbaum 1986; the other direction is not needed to satisfy the clauses by a
 * model); then those of the order.
 *
 * The order: a sentence names no points, so a model stays one when its points exchange their names. Written as the list
 * of the values of its variables, one of the finitely many models got by renaming is the least, false before true.
 * It is at most as great as what it becomes when two points change places, and for each two points clauses say that
 * (Crawford, Ginsberg, Luks & Roy 1996).
 * @throws FormulaTooLarge
 */
export function groundForm(sentences: readonly FormulaRecord[], size: number, meter: Meter): GroundForm {
  const growth = new Growth(LARGEST_GROUND_FORM, meter);
  const everyPoint = Array.from({ length: size }, (_, point) => point);
  const clauses: (readonly number[])[] = [];
  let variables = 0;
  const tables = relationsOf(sentences, growth).map(([name, places]) => {
    const table = { name, places, before: variables };
    variables += size ** places;
    growth.add(size ** places);
    return table;
  });
  const defined = new Map<FormulaRecord, Map<string, number | boolean>>();
  for (const sentence of sentences) assert(miniscopeFormula(sentence, growth), new Map());
  for (const first of everyPoint) for (const second of everyPoint.slice(first + 1)) order(first, second);
  return { variables, clauses };

  function assert(part: FormulaRecord, points: Points): void {
    if (part[0] === "and") for (const inner of partsOf(part)) assert(inner, points);
    else if (part[0] === "forall")
      for (const point of everyPoint) assert(part[2], new Map(points).set(part[1], point));
    else {
      const literals = new Set<number>();
      if (!gather("or", part, points, literals)) push([...literals]);
    }
  }

  /** Adds the literals of a part of a conjunction or disjunction; true when the part decides it. */
  function gather(kind: "and" | "or", part: FormulaRecord, points: Points, literals: Set<number>): boolean {
    growth.add();
    if (part[0] === kind) return partsOf(part).some((inner) => gather(kind, inner, points, literals));
    if (part[0] === (kind === "and" ? "forall" : "exists")) {
      const [, variable, body] = part as readonly ["forall" | "exists", string, FormulaRecord];
      return everyPoint.some((point) => gather(kind, body, new Map(points).set(variable, point), literals));
    }
    const value = literalFor(part, points);
    if (typeof value === "boolean") return value === (kind === "or");
    literals.add(value);
    return false;
  }

  /** A literal that implies the part, or its value where the points decide it. */
  function literalFor(part: FormulaRecord, points: Points): number | boolean {
    switch (part[0]) {
      case "true":
      case "false":
        return part[0] === "true";
      case "not": {
        const value = literalFor(part[1], points);
        return typeof value === "boolean" ? !value : -value;
      }
      case "is":
      case "=": {
        const args = atomTerms(part).map((variable) => points.get(variable as string)!);
        if (part[0] === "=") return args[0] === args[1];
        const table = tables.find(({ name, places }) => name === part[1] && places === args.length)!;
        return args.reduce((row, point) => row * size + point, 0) + table.before + 1;
      }
      default: {
        const values = defined.get(part) ?? new Map<string, number | boolean>();
        defined.set(part, values);
        const key = freeVariables(part)
          .map((variable) => points.get(variable))
          .join();
        const value = values.get(key) ?? define(part, points);
        values.set(key, value);
        return value;
      }
    }
  }

  function define(part: FormulaRecord, points: Points): number | boolean {
    const kind = part[0] === "and" || part[0] === "forall" ? "and" : "or";
    const literals = new Set<number>();
    if (gather(kind, part, points, literals)) return kind === "or";
    const [first, ...others] = literals;
    if (first === undefined) return kind === "and";
    if (others.length === 0) return first;
    variables += 1;
    if (kind === "or") push([-variables, first, ...others]);
    else for (const literal of literals) push([-variables, literal]);
    return variables;
  }

  /** The values of the tuples' variables are at most what they become when two points change places. */
  function order(first: number, second: number): void {
    growth.add();
    // Implied when all values so far stay the same; null when there are none.
    let same: number | null = null;
    for (const { places, before } of tables)
      for (let row = 0; row < size ** places; row += 1) {
        let moved = 0;
        for (let place = places - 1; place >= 0; place -= 1) {
          const point = Math.floor(row / size ** place) % size;
          moved = moved * size + (point === first ? second : point === second ? first : point);
        }
        // A tuple that stays, or whose counterpart came before, makes no difference.
        if (moved <= row) continue;
        const [value, other] = [before + row + 1, before + moved + 1];
        const given = same === null ? [] : [-same];
        variables += 1;
        push([...given, -value, other]);
        push([...given, -value, variables]);
        push([...given, other, variables]);
        same = variables;
      }
  }

  function push(clause: readonly number[]): void {
    growth.add(1 + clause.length);
    clauses.push(clause);
  }
}

/** The relations of sentences with their places, by name and then by places. */
function relationsOf(sentences: readonly FormulaRecord[], growth: Growth): (readonly [string, number])[] {
  const found = new Map<string, readonly [string, number]>();
  for (const sentence of sentences)
    visitAtoms(sentence, growth, (atom) => {
      if (atom[0] === "is") found.set(JSON.stringify([atom[1], atom.length]), [atom[1], atom.length - 2]);
    });
  return [...found.values()].sort(([a, m], [b, n]) => (a < b ? -1 : a > b ? 1 : m - n));
}
