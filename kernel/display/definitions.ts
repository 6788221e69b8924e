/** What is shown for statements that ask nothing: declarations, definitions and descriptions. */
import type { Findings } from "../../lib/inquiry/examine.ts";
import type { Definition, DescribeSubject, Statement } from "../../lib/language/statements.ts";
import { depthOf, type Formula, relationsOf, usesIdentity, variablesOf } from "../../lib/logic/formula.ts";
import { describeSyntax } from "../../lib/logic/fragments.ts";
import type { Theory } from "../../lib/logic/theory.ts";
import type { Shown } from "./answers.ts";
import { type Block, code, formulaOf, type Inline, line } from "./blocks.ts";
import { renderBundle } from "./bundle.ts";
import { findingBlocks } from "./findings.ts";
import { definitionBlocks, domainOfDefinition } from "./structures.ts";
import { counted, enumerate } from "./text.ts";
import {
  FOLDED_AXIOMS,
  factTable,
  fragmentBlocks,
  identityText,
  prefixOf,
  relationText,
  syntaxFacts,
  theoryFacts,
  theoryTable,
} from "./theories.ts";

/** A quiet confirmation of `relation` or `define`. */
export function showDefinition(statement: Statement & { readonly kind: "relation" | "define" }): Shown {
  if (statement.kind === "relation") {
    const summary = `declared ${enumerate(statement.relations.map(relationText))}`;
    return { summary, data: renderBundle([line(summary)], "without-latex") };
  }
  const { definition } = statement;
  const summary = `defined ${definition.name}: ${definitionText(definition)}`;
  return {
    summary,
    data: renderBundle(
      [line("defined ", code(definition.name), `: ${definitionText(definition)}`)],
      "without-latex",
    ),
  };
}

function definitionText(definition: Definition): string {
  switch (definition.kind) {
    case "theory":
      return `a theory of ${counted(definition.theory.axioms.length, "axiom")}`;
    case "structure":
      return `a structure on ${domainOfDefinition(definition.structure)}`;
    case "formula":
      return definition.parameters.length === 0
        ? "a sentence"
        : `a formula with ${counted(definition.parameters.length, "parameter")}`;
  }
}

/**
 * `describe X`. {@link prepareDrawing} must have been awaited.
 * @param findings what has been found out about a theory besides; null for everything else
 */
export function showDescription(
  statement: Statement & { readonly kind: "describe" },
  findings: Findings | null = null,
): Shown {
  const { summary, blocks } = describeSubject(statement.subject, findings);
  return { summary, data: renderBundle(blocks, "with-latex") };
}

/** The line and the blocks of a description. */
export function describeSubject(
  subject: DescribeSubject,
  findings: Findings | null = null,
): {
  readonly summary: string;
  readonly blocks: readonly Block[];
} {
  switch (subject.kind) {
    case "theory": {
      const { text, theory } = subject.theory;
      const summary = `${text}: a theory of ${counted(theory.axioms.length, "axiom")}`;
      return {
        summary,
        blocks: [
          line(code(text), summary.slice(text.length)),
          ...theoryBlocks(theory),
          ...theoryFacts(theory),
          ...(findings === null ? [] : findingBlocks(findings)),
        ],
      };
    }
    case "structure": {
      const { text, structure } = subject.structure;
      const summary = `${text}: a structure on ${domainOfDefinition(structure)}`;
      const relations = structure.relations.map(({ relation }) => relationText(relation)).join(", ");
      return {
        summary,
        blocks: [
          line(code(text), summary.slice(text.length)),
          ...definitionBlocks("in cell text", structure),
          factTable([["relations", relations || "none"]]),
        ],
      };
    }
    case "formula": {
      const { name, parameters, body } = subject.definition;
      const head = parameters.length === 0 ? name : `${name}(${parameters.join(", ")})`;
      const kind = definitionText(subject.definition);
      return {
        summary: `${name}: ${kind}`,
        blocks: [line(code(head), ` := `, formulaOf(body)), ...formulaFacts(body, parameters.length === 0)],
      };
    }
    case "sentence": {
      const { formula } = subject.sentence;
      return {
        summary: `a sentence of depth ${depthOf(formula)}`,
        blocks: [line(formulaOf(formula)), ...formulaFacts(formula, true)],
      };
    }
    case "relation": {
      const { relation } = subject;
      const summary = `${relation.name}: a relation of ${counted(relation.places, "place")}${relation.infix ? ", infix" : ""}`;
      return { summary, blocks: [line(code(relation.name), summary.slice(relation.name.length))] };
    }
  }
}

/** The table of a theory; what goes beyond a screen is folded. */
function theoryBlocks(theory: Theory): readonly Block[] {
  if (theory.axioms.length <= FOLDED_AXIOMS) return [theoryTable(null, theory, "prefix")];
  const first = { ...theory, axioms: theory.axioms.slice(0, FOLDED_AXIOMS) };
  const rest = { ...theory, axioms: theory.axioms.slice(FOLDED_AXIOMS) };
  return [
    theoryTable(null, first, "prefix"),
    {
      kind: "fold",
      title: counted(rest.axioms.length, "more axiom"),
      blocks: [theoryTable(null, rest, "prefix")],
    },
  ];
}

function formulaFacts(formula: Formula, isClosed: boolean): readonly Block[] {
  const variables = variablesOf(formula);
  const facts: [string, Inline][] = [
    ["signature", relationsOf(formula).map(relationText).join(", ") || "no relations"],
    [
      "identity",
      isClosed
        ? identityText(usesIdentity(formula))
        : usesIdentity(formula)
          ? "= occurs"
          : "= does not occur",
    ],
    ["depth", String(depthOf(formula))],
    ["variables", variables.length === 0 ? "0" : `${variables.length}: ${variables.join(", ")}`],
  ];
  if (!isClosed) return [factTable([...facts, ["prefix", prefixOf(formula)]])];
  const report = describeSyntax([formula]);
  return [factTable([...facts, ...syntaxFacts(report, false)]), ...fragmentBlocks(report)];
}
