/** Structures of free terms as they are shown: the constructors, and each relation by its recursion. */
import type { TermStructure } from "../../lib/carriers/any-structure.ts";
import type { Term, TermFormula } from "../../lib/logic/clausal.ts";
import { partsOf, type TermFormulaRecord, type TermRecord } from "../../lib/logic/records/formulas.ts";
import { describeTerms } from "../../lib/structures/free-terms/describe.ts";
import {
  type Block,
  enumerated,
  formulaOf,
  type Inline,
  line,
  type TableBlock,
  termOf,
  words,
} from "./blocks.ts";
import { inlineToText } from "./to-text.ts";

/** The words for the domain, after `on`: `the free terms of e and f(x, y)`. */
export function termsWords(structure: TermStructure): string {
  return inlineToText(domainParts(structure));
}

function domainParts({ terms }: TermStructure): readonly Inline[] {
  const { constructors } = describeTerms(terms);
  return words`the free terms of ${enumerated(constructors.map((one) => termOf(termOfRecord(one))))}`;
}

/** @param role as a noun phrase: `countermodel` */
export function termsBlocks(role: string, structure: TermStructure): readonly Block[] {
  const { clauses } = describeTerms(structure.terms);
  const table: TableBlock = {
    kind: "table",
    caption: null,
    head: ["holds", "exactly when"],
    rows: clauses.map(({ head, body }) => [
      [formulaOf(formulaOfRecord(head))],
      [body[0] === "true" ? "always" : body[0] === "false" ? "never" : formulaOf(formulaOfRecord(body))],
    ]),
    look: "prose",
  };
  const remark =
    "The elements are all terms that can be made of these, and terms that are written differently are different.";
  const title = line(
    ...words`${role}${/infinite/.test(role) ? "" : ", infinite"}: ${domainParts(structure)}`,
  );
  return [{ kind: "group", blocks: [title, line(remark), table] }];
}

function termOfRecord(record: TermRecord): Term {
  if (typeof record === "string") return record;
  const [name, ...args] = record;
  // Where a function comes from does not matter to printing.
  const origin = { kind: "parameter", variable: name } as const;
  return { symbol: { name, places: args.length, origin }, args: args.map(termOfRecord) };
}

function formulaOfRecord(record: TermFormulaRecord): TermFormula {
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
