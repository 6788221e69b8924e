/** Structures of free terms as they are shown: the constructors, and each relation by its recursion. */
import type { TermStructure } from "../../lib/carriers/any-structure.ts";
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
import { formulaOfRecord, termOfRecord } from "./term-records.ts";
import { drawTerms } from "./term-samples.ts";
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
  const picture = drawTerms(structure.terms);
  const views: Block = { kind: "beside", blocks: picture === null ? [table] : [table, picture] };
  return [{ kind: "group", blocks: [title, line(remark), views] }];
}
