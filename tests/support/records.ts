/** Formulas of evidence as formulas again, for judges that know nothing of records. */
import type { FormulaRecord } from "../../lib/evidence/format.ts";
import { equal, type Formula, falsum, verum } from "../../lib/logic/formula.ts";

/** @param record a sentence: its terms are variables */
export function formulaOf(record: FormulaRecord): Formula {
  const [head, ...rest] = record as readonly [string, ...unknown[]];
  const inner = (place: number) => formulaOf(rest[place] as FormulaRecord);
  switch (head) {
    case "true":
      return verum;
    case "false":
      return falsum;
    case "is": {
      const [name, ...args] = rest as string[];
      return { kind: "atom", relation: { name: name!, places: args.length, infix: false }, args };
    }
    case "=":
      return equal(rest[0] as string, rest[1] as string);
    case "not":
      return { kind: "not", body: inner(0) };
    case "and":
    case "or":
      return { kind: head, parts: rest.map((_, place) => inner(place)) };
    case "implies":
    case "iff":
      return { kind: head, left: inner(0), right: inner(1) };
    default:
      return { kind: head as "forall" | "exists", variable: rest[0] as string, body: inner(1) };
  }
}
