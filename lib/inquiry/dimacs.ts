/** A theory or a question on so many points, as the clauses of a propositional problem in DIMACS CNF. */
import { Points } from "../carriers/points.ts";
import type { Formula } from "../logic/formula.ts";
import { not } from "../logic/formula.ts";
import { type EndReason, WorkEnded } from "../logic/meter.ts";
import { sentencesOf, type Theory } from "../logic/theory.ts";
import { printDimacs } from "../structures/sat/dimacs.ts";
import { layOut } from "../structures/search.ts";
import { jointSignature } from "./finite-search.ts";
import { meterFor, type Work } from "./work.ts";

/** Entries of tables that are named in comments; more would bury the clauses. */
const NAMED_ENTRIES = 400;

/**
 * The clauses are satisfiable if and only if the theory has a model on that many points, in which the conclusion, if
 * there is one, fails. No symmetry is broken and every further variable is a function of the table, so that the
 * assignments that satisfy them are the models, one for one.
 */
export function writeDimacs(
  theory: Theory,
  conclusion: Formula | null,
  size: number,
  work: Work,
): { readonly text: string } | { readonly ended: EndReason } {
  const sentences = [...sentencesOf(theory), ...(conclusion === null ? [] : [not(conclusion)])];
  const { relations } = jointSignature([theory], conclusion === null ? [] : [conclusion]);
  const carrier = new Points(size);
  const clauses: (readonly number[])[] = [];
  let variables = 0;
  const sink = {
    newVariable: () => ++variables,
    addClause: (literals: readonly number[]) => clauses.push([...new Set(literals)]),
  };
  try {
    const layout = layOut({ carrier, sentences, relations }, sink, meterFor(work), true, false);
    const comments = relations.flatMap((relation, index) =>
      [...layout.variables[index]!].map(
        (variable, kind) =>
          `${variable} is ${relation.name}(${carrier.tupleOf(relation.places, kind).join()})`,
      ),
    );
    const shown = comments.slice(0, NAMED_ENTRIES);
    if (shown.length < comments.length) shown.push(`… and so on, ${comments.length} variables in all`);
    return { text: printDimacs(variables, clauses, shown) };
  } catch (problem) {
    if (problem instanceof WorkEnded) return { ended: problem.reason };
    throw problem;
  }
}
