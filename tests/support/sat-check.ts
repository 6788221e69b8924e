/** Clauses at random, their models by definition, and a checker for proofs by unit propagation. */
import fc from "fast-check";
import { Solver } from "../../lib/structures/sat/solver.ts";

/** A clause of signed literals. */
export type Clause = readonly number[];

export interface Cnf {
  readonly variables: number;
  readonly clauses: readonly Clause[];
}

/** Random clauses over few variables, some empty, with repeated and opposite literals. */
export function cnfs(mostVariables: number, mostLength = 4): fc.Arbitrary<Cnf> {
  return fc.integer({ min: 1, max: mostVariables }).chain((variables) =>
    fc.record({
      variables: fc.constant(variables),
      clauses: fc.array(
        fc.array(literals(variables), { minLength: 1, maxLength: mostLength }),
        // Around four clauses to a variable random clauses of three literals are hardest (common practice).
        { minLength: variables, maxLength: variables * 5 },
      ),
    }),
  );
}

export function literals(variables: number): fc.Arbitrary<number> {
  return fc
    .tuple(fc.integer({ min: 1, max: variables }), fc.boolean())
    .map(([variable, positive]) => (positive ? variable : -variable));
}

/** Whether an assignment, bit v − 1 for variable v, makes a clause true. */
export function holds(assignment: number, clause: Clause): boolean {
  return clause.some((literal) => ((assignment >> (Math.abs(literal) - 1)) & 1) === (literal > 0 ? 1 : 0));
}

/** All assignments that make every clause true. */
export function modelsOf({ variables, clauses }: Cnf): number[] {
  const models: number[] = [];
  for (let assignment = 0; assignment < 2 ** variables; assignment += 1)
    if (clauses.every((clause) => holds(assignment, clause))) models.push(assignment);
  return models;
}

export function solverFor(cnf: Cnf, solver = new Solver()): Solver {
  while (solver.variableCount < cnf.variables) solver.newVariable();
  for (const clause of cnf.clauses) solver.addClause(clause);
  return solver;
}

/** The pigeonhole principle: one pigeon more than holes, each pigeon in a hole, no two in one. */
export function pigeonhole(holes: number): Cnf {
  const sits = (pigeon: number, hole: number) => pigeon * holes + hole + 1;
  const clauses: number[][] = [];
  for (let pigeon = 0; pigeon <= holes; pigeon += 1) {
    clauses.push(Array.from({ length: holes }, (_, hole) => sits(pigeon, hole)));
    for (let other = 0; other < pigeon; other += 1)
      for (let hole = 0; hole < holes; hole += 1) clauses.push([-sits(pigeon, hole), -sits(other, hole)]);
  }
  return { variables: (holes + 1) * holes, clauses };
}

/** A line of a clause proof. */
export interface ProofLine {
  readonly kind: "derived" | "deleted";
  readonly clause: Clause;
}

/**
 * Checks a proof by definition: of each derived clause, that the negations of its literals lead by unit propagation
 * to a clause without true or open literals (Goldberg & Novikov 2003). Slow and short on purpose: it shares nothing
 * with the solver.
 * @returns the index of the first line that does not follow, or −1
 */
export function firstBadLine(given: readonly Clause[], proof: readonly ProofLine[]): number {
  const clauses = given.map((clause) => [...new Set(clause)]);
  const name = (clause: Clause) => [...new Set(clause)].sort((a, b) => a - b).join();
  for (let line = 0; line < proof.length; line += 1) {
    const { kind, clause } = proof[line]!;
    if (kind === "deleted") {
      const index = clauses.findIndex((other) => name(other) === name(clause));
      if (index < 0) return line;
      clauses.splice(index, 1);
    } else {
      if (!followsByPropagation(clauses, clause)) return line;
      clauses.push([...clause]);
    }
  }
  return -1;
}

function followsByPropagation(clauses: readonly Clause[], clause: Clause): boolean {
  const truths = new Set(clause.map((literal) => -literal));
  for (let changed = true; changed; ) {
    changed = false;
    for (const other of clauses) {
      if (other.some((literal) => truths.has(literal))) continue;
      const open = other.filter((literal) => !truths.has(-literal));
      if (open.length === 0) return true;
      if (open.length === 1) {
        truths.add(open[0]!);
        changed = true;
      }
    }
  }
  return clause.some((literal) => truths.has(literal) && truths.has(-literal));
}
