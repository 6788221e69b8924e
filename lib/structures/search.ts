/** The search for a structure on a given carrier in which given sentences hold. */
import type { Carrier } from "../carriers/carrier.ts";
import type { Structure, Table } from "../carriers/structure.ts";
import type { Formula, RelationSymbol } from "../logic/formula.ts";
import { type EndReason, type Meter, WorkEnded } from "../logic/meter.ts";
import { Circuit, type ClauseSink, FALSE } from "./circuit.ts";
import { Clausifier } from "./clausify.ts";
import { ground, unknownTables } from "./ground.ts";
import { Solver } from "./sat/solver.ts";
import { breakSymmetry } from "./symmetry.ts";

/** Table entries laid out before an interrupt is looked for. */
const POLLED_AT_ONCE = 4096;

export interface SearchTask {
  readonly carrier: Carrier;
  /** Closed; all are to hold. */
  readonly sentences: readonly Formula[];
  /** All relations that occur in the sentences, and others that the structure is to interpret. */
  readonly relations: readonly RelationSymbol[];
}

/** What a search on one carrier came to. `none` is certain: the whole carrier was searched. */
export type SearchOutcome =
  | { readonly result: "found"; readonly structure: Structure }
  | { readonly result: "none" }
  | { readonly result: "ended"; readonly reason: EndReason };

/** How many table entries were laid out, and where their variables are. */
export interface Layout {
  /** For each relation of the task, in its order, the variable of each kind. */
  readonly variables: readonly Int32Array[];
  /** Whether the sentences already contradicted each other when they were unfolded. */
  readonly contradictory: boolean;
}

/**
 * Lays a task out as clauses.
 * @param bothWays whether every auxiliary variable of the sentences is to be a function of the table
 * @param upToIsomorphism whether symmetric copies are to be cut off; at least one of each class of isomorphic
 *   structures stays
 * @throws WorkEnded when the meter's budget ends, the user interrupts or memory runs out
 */
export function layOut(
  task: SearchTask,
  sink: ClauseSink,
  meter: Meter,
  bothWays = false,
  upToIsomorphism = true,
): Layout {
  const circuit = new Circuit(meter);
  const tables = unknownTables(task.carrier, task.relations, circuit, meter);
  const clausifier = new Clausifier(circuit, sink, meter, bothWays);
  let entries = 0;
  for (const inputs of tables.values()) entries += inputs.length;
  sink.reserve?.(entries);
  const variables = task.relations.map((relation) =>
    tables.get(relation.name)!.map((input, kind) => {
      if (kind % POLLED_AT_ONCE === 0) meter.charge(0);
      return clausifier.variableOf(input);
    }),
  );
  for (const sentence of task.sentences) {
    const reference = ground(task.carrier, sentence, tables, circuit, meter);
    clausifier.assert(reference);
    if (reference === FALSE) {
      sink.addClause([]);
      return { variables, contradictory: true };
    }
  }
  if (upToIsomorphism)
    breakSymmetry(task.carrier, task.relations, (relation, kind) => variables[relation]![kind]!, sink, meter);
  return { variables, contradictory: false };
}

/** Looks for a structure. Everything it does is counted on the meter; it is deterministic. */
export function findStructure(task: SearchTask, meter: Meter): SearchOutcome {
  try {
    const solver = new Solver();
    const layout = layOut(task, solver, meter);
    if (layout.contradictory) return { result: "none" };
    const answer = solver.solve(meter);
    if (answer === "ended") return { result: "ended", reason: meter.ended ?? "budget" };
    if (answer === "unsatisfiable") return { result: "none" };
    return { result: "found", structure: structureFrom(task, layout, (variable) => solver.value(variable)) };
  } catch (problem) {
    if (problem instanceof WorkEnded) return { result: "ended", reason: problem.reason };
    throw problem;
  }
}

/**
 * Calls `see` with every structure on the carrier in which the sentences hold, at least one of each class of
 * isomorphic ones and some more than once, until it returns false.
 */
export function enumerateStructures(
  task: SearchTask,
  meter: Meter,
  see: (structure: Structure) => boolean,
): "complete" | "stopped" | EndReason {
  try {
    const solver = new Solver();
    const layout = layOut(task, solver, meter);
    if (layout.contradictory) return "complete";
    const over = layout.variables.flatMap((variables) => [...variables]);
    const places = new Int32Array(over.reduce((most, variable) => Math.max(most, variable), 0) + 1);
    for (const [place, variable] of over.entries()) places[variable] = place;
    const end = solver.enumerate(meter, over, (values) =>
      see(structureFrom(task, layout, (variable) => values[places[variable]!] === 1)),
    );
    return end === "ended" ? (meter.ended ?? "budget") : end;
  } catch (problem) {
    if (problem instanceof WorkEnded) return problem.reason;
    throw problem;
  }
}

function structureFrom(task: SearchTask, layout: Layout, isTrue: (variable: number) => boolean): Structure {
  const tables = new Map<string, Table>();
  task.relations.forEach((relation, index) => {
    const holds = Uint8Array.from(layout.variables[index]!, (variable) => (isTrue(variable) ? 1 : 0));
    tables.set(relation.name, { relation, holds });
  });
  return { carrier: task.carrier, tables };
}
