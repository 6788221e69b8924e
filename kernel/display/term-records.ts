/** Terms and formulas of records as the printer takes them. */
import type { Term, TermFormula } from "../../lib/logic/clausal.ts";
import { partsOf, type TermFormulaRecord, type TermRecord } from "../../lib/logic/records/formulas.ts";

/** The term of a record. */
export function termOfRecord(record: TermRecord): Term {
  if (typeof record === "string") return record;
  const [name, ...args] = record;
  // Where a function comes from does not matter to printing.
  const origin = { kind: "parameter", variable: name } as const;
  return { symbol: { name, places: args.length, origin }, args: args.map(termOfRecord) };
}

export function formulaOfRecord(record: TermFormulaRecord): TermFormula {
  switch (record[0]) {
    case "is": {
      const [, name, ...args] = record;
      const infix = args.length === 2 && !/^\p{L}/u.test(name);
      return {
        kind: "atom",
        relation: { name, places: args.length, infix },
        args: args.map(termOfRecord),
      };
    }
    case "=":
      return { kind: "equal", left: termOfRecord(record[1]), right: termOfRecord(record[2]) };
    case "true":
    case "false":
      return { kind: record[0] };
    case "not":
      return { kind: "not", body: formulaOfRecord(record[1]) };
    case "and":
    case "or":
      return { kind: record[0], parts: partsOf(record).map(formulaOfRecord) };
    case "implies":
    case "iff":
      return { kind: record[0], left: formulaOfRecord(record[1]), right: formulaOfRecord(record[2]) };
    case "forall":
    case "exists":
      return { kind: record[0], variable: record[1], body: formulaOfRecord(record[2]) };
  }
}
