/** A structure of free terms as it is shown: its constructors, and a clause for each relation and constructor. */
import type { TermsRecord } from "../../carriers/free-terms.ts";
import type { AtomRecord, TermFormulaRecord, TermRecord } from "../../logic/records/formulas.ts";

export interface TermsDescription {
  /** Constants first, in the order of the record; each with variables for its arguments: `["f", "x", "y"]`. */
  readonly constructors: readonly TermRecord[];
  /** By relation, then by constructor in that order. */
  readonly clauses: readonly TermsClause[];
}

/** `head` holds just where `body` does. */
export interface TermsClause {
  /** The relation at the variables of its other places and a value of the constructor. */
  readonly head: AtomRecord;
  /** Without quantifiers; of terms, only values of constructors are no variables. */
  readonly body: TermFormulaRecord;
}

/** The parts of a structure of free terms. */
export function describeTerms({ constructors, relations }: TermsRecord): TermsDescription {
  const values = Object.entries(constructors)
    .sort(([, a], [, b]) => Number(a.length > 0) - Number(b.length > 0))
    .map(([symbol, args]): readonly [string, ...string[]] => [symbol, ...args]);
  const clauses = Object.entries(relations).flatMap(([relation, { on, others, cases }]) =>
    values.map(
      (value): TermsClause => ({
        head: ["is", relation, ...others.slice(0, on), value, ...others.slice(on)],
        body: cases[value[0]]!,
      }),
    ),
  );
  return { constructors: values, clauses };
}
