/** Counting the structures of one size in which given sentences hold: labelled ones, and classes of isomorphic ones. */
import { Points } from "../carriers/points.ts";
import type { Structure } from "../carriers/structure.ts";
import type { Formula, RelationSymbol } from "../logic/formula.ts";
import { type EndReason, type Meter, WorkEnded } from "../logic/meter.ts";
import { MeterShare } from "../logic/share.ts";
import { Canoniser } from "./canonical.ts";
import { ClauseList, countAssignments } from "./components.ts";
import { FormSet } from "./forms.ts";
import { Solver } from "./sat/solver.ts";
import { layOut } from "./search.ts";

export interface CountTask {
  /** How many points; at least 1. */
  readonly size: number;
  /** Closed; all are to hold. */
  readonly sentences: readonly Formula[];
  /** All relations that occur in the sentences, and others that are to be interpreted. */
  readonly relations: readonly RelationSymbol[];
}

export interface CountOptions {
  /** How many representatives are kept at most, the first ones found; 0 when left out. */
  readonly representatives?: number;
}

/** What a count came to. A number that is there is exact; where the work ended before it was known, it is null. */
export interface CountOutcome {
  /** Structures on the points 1 to n. */
  readonly labelled: bigint | null;
  /** Classes of isomorphic structures. */
  readonly unlabelled: bigint | null;
  /** One structure of each class, in the order found, as many as were asked for; of the finished part if it ended. */
  readonly representatives: readonly Structure[];
  /** Classes that were found, all of them when the work did not end. */
  readonly classesFound: number;
  /** Why a number is missing; null when both are there. */
  readonly ended: EndReason | null;
}

/** What is kept of the budget for the labelled count alone, in case the classes are too many: one part of so many. */
const LABELLED_SHARE = 10;

/**
 * Counts by classes: enumerates structures with symmetric copies cut off, tells classes apart by canonical forms, and
 * adds up n!/|automorphism group| for the labelled number (orbit-stabiliser theorem). When the classes are too many
 * for the budget or for memory, what was kept of the budget goes into the labelled number alone, which may be within
 * reach where the sentences fall into independent parts. Deterministic; everything is counted on the meter.
 */
export function countStructures(task: CountTask, meter: Meter, options: CountOptions = {}): CountOutcome {
  const share = new MeterShare(meter, (meter.left / 1000) * (1 - 1 / LABELLED_SHARE));
  const classes = countClasses(task, share.meter, options.representatives ?? 0);
  const mayGoOn = share.settle();
  if (classes.labelled !== null || !mayGoOn)
    return { ...classes, ended: classes.labelled === null ? share.ended : null };
  const { labelled } = countLabelled(task, meter);
  return { ...classes, labelled, ended: share.ended };
}

/** Counts the structures on the points 1 to n by going through them, independent parts apart. */
export function countLabelled(
  task: CountTask,
  meter: Meter,
): { readonly labelled: bigint | null; readonly ended: EndReason | null } {
  try {
    const list = new ClauseList(meter);
    const layout = layOut({ ...task, carrier: new Points(task.size) }, list, meter, true, false);
    if (layout.contradictory) return { labelled: 0n, ended: null };
    const over = layout.variables.flatMap((variables) => [...variables]);
    const labelled = countAssignments(list, over, meter);
    return { labelled, ended: labelled === null ? (meter.ended ?? "budget") : null };
  } catch (problem) {
    if (problem instanceof WorkEnded) return { labelled: null, ended: problem.reason };
    throw problem;
  }
}

function countClasses(task: CountTask, meter: Meter, wanted: number): CountOutcome {
  const { size, relations } = task;
  const carrier = new Points(size);
  const representatives: Structure[] = [];
  /** For each number of automorphisms, how many classes have it. */
  const byAutomorphisms = new Map<bigint, number>();
  let classesFound = 0;
  const outcome = (ended: EndReason | null): CountOutcome => {
    if (ended !== null) return { labelled: null, unlabelled: null, representatives, classesFound, ended };
    const renamings = factorial(size);
    let labelled = 0n;
    for (const [automorphisms, classes] of byAutomorphisms)
      labelled += (renamings / automorphisms) * BigInt(classes);
    return { labelled, unlabelled: BigInt(classesFound), representatives, classesFound, ended: null };
  };
  try {
    const solver = new Solver();
    const layout = layOut({ ...task, carrier }, solver, meter, true);
    if (layout.contradictory) return outcome(null);
    const canoniser = new Canoniser(
      size,
      relations.map((relation) => relation.places),
    );
    let forms: FormSet | null = null;
    const over = layout.variables.flatMap((variables) => [...variables]);
    /** For each relation its stretch of the array that the solver fills with every structure found. */
    let tables: Uint8Array[] | null = null;
    const end = solver.enumerate(meter, over, (values) => {
      if (tables === null) {
        tables = [];
        let from = 0;
        for (const { length } of layout.variables) {
          tables.push(values.subarray(from, from + length));
          from += length;
        }
      }
      const form = canoniser.canoniseToBytes(tables, meter);
      forms ??= new FormSet(form.length);
      if (!forms.add(form, meter)) return true;
      classesFound += 1;
      const automorphisms = canoniser.automorphismCount;
      byAutomorphisms.set(automorphisms, (byAutomorphisms.get(automorphisms) ?? 0) + 1);
      if (representatives.length < wanted)
        representatives.push({
          carrier,
          tables: new Map(
            relations.map((relation, index) => [relation.name, { relation, holds: tables![index]!.slice() }]),
          ),
        });
      return true;
    });
    return outcome(end === "complete" ? null : (meter.ended ?? "budget"));
  } catch (problem) {
    if (problem instanceof WorkEnded) return outcome(problem.reason);
    throw problem;
  }
}

function factorial(n: number): bigint {
  let product = 1n;
  for (let factor = 2; factor <= n; factor += 1) product *= BigInt(factor);
  return product;
}
