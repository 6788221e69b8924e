/** Structures of free terms as they are shown: the constructors, and each relation by its recursion. */
import type { TermStructure } from "../../lib/carriers/any-structure.ts";
import type { RecursionRecord, TermsRecord } from "../../lib/carriers/free-terms.ts";
import { partsOf, type TermFormulaRecord, type TermRecord } from "../../lib/logic/records/formulas.ts";
import { type Block, line, type TableBlock } from "./blocks.ts";
import { enumerate } from "./text.ts";

/** The words for the domain, after `on`: `the free terms of e and f(x, y)`. */
export function termsWords({ terms }: TermStructure): string {
  const constructors = Object.entries(terms.constructors).map(([name, args]) =>
    args.length === 0 ? name : `${name}(${args.join(", ")})`,
  );
  return `the free terms of ${enumerate(constructors)}`;
}

/** @param role as a noun phrase: `countermodel` */
export function termsBlocks(role: string, structure: TermStructure): readonly Block[] {
  const { terms } = structure;
  const table: TableBlock = {
    kind: "table",
    caption: null,
    head: ["holds", "exactly when"],
    rows: Object.entries(terms.relations).flatMap(([name, relation]) => casesOf(terms, name, relation)),
    look: "prose",
  };
  return [
    {
      kind: "group",
      blocks: [
        line(`${role}, infinite: ${termsWords(structure)}`),
        line(
          "Its elements are all terms that can be made of these; terms that are written differently are different.",
        ),
        table,
      ],
    },
  ];
}

/** For each constructor, where the relation holds of a term that begins with it. */
function casesOf(
  { constructors }: TermsRecord,
  name: string,
  { on, others, cases }: RecursionRecord,
): TableBlock["rows"] {
  return Object.entries(cases).map(([constructor, formula]) => {
    const term: TermRecord = [constructor, ...constructors[constructor]!];
    const args: readonly TermRecord[] = others.toSpliced(on, 0, term as never);
    return [[termText(["is", name, ...args])], [termFormulaText(formula)]];
  });
}

/** For `eval --json`. */
export function termsData({ terms }: TermStructure): Readonly<Record<string, unknown>> {
  return { terms };
}

/** How tightly the sign of a formula binds. */
const BINDING: Readonly<Record<string, number>> = { iff: 1, implies: 2, or: 3, and: 4 };
const SIGNS: Readonly<Record<string, string>> = { iff: " ↔ ", implies: " → ", or: " ∨ ", and: " ∧ " };

function termFormulaText(formula: TermFormulaRecord, least = 0): string {
  switch (formula[0]) {
    case "is":
    case "=":
      return termText(formula);
    case "true":
      return "always";
    case "false":
      return "never";
    case "not": {
      const [, body] = formula;
      return body[0] === "=" ? `${argText(body[1])} ≠ ${argText(body[2])}` : `¬${termFormulaText(body, 5)}`;
    }
    case "forall":
    case "exists":
      throw new Error("a quantifier in a definition by recursion");
    default: {
      const own = BINDING[formula[0]]!;
      const text = partsOf(formula)
        .map((part) => termFormulaText(part, own + 1))
        .join(SIGNS[formula[0]]);
      return own < least ? `(${text})` : text;
    }
  }
}

function termText(atom: TermFormulaRecord & readonly ["is" | "=", ...unknown[]]): string {
  if (atom[0] === "=") return `${argText(atom[1] as TermRecord)} = ${argText(atom[2] as TermRecord)}`;
  const [, name, ...args] = atom as readonly ["is", string, ...TermRecord[]];
  return `${name}(${args.map(argText).join(", ")})`;
}

function argText(term: TermRecord): string {
  if (typeof term === "string") return term;
  const [name, ...args] = term;
  return args.length === 0 ? name : `${name}(${args.map(argText).join(", ")})`;
}
