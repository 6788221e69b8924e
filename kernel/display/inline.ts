/** Short values for the middle of sentences: a verdict, a count, a formula, and what a name stands for. */
import { buildStructure } from "../../lib/carriers/defined.ts";
import type { Answer } from "../../lib/inquiry/answer.ts";
import { printStructureDefinition } from "../../lib/language/carrier-printing.ts";
import { printAxiomSet } from "../../lib/language/printer.ts";
import type { Statement } from "../../lib/language/statements.ts";
import type { Formula } from "../../lib/logic/formula.ts";
import type { StructureDefinition } from "../../lib/logic/structure-definition.ts";
import type { Theory } from "../../lib/logic/theory.ts";
import type { MimeBundle } from "../session/evaluator.ts";
import { cellOf, code, formulaOf } from "./blocks.ts";
import { showInline } from "./bundle.ts";
import { reasonParagraph } from "./reasons.ts";
import { domainOf, sourceOf } from "./structures.ts";
import { axiomsAsked } from "./summaries.ts";
import { grouped } from "./text.ts";

/** The word alone. */
export function inlineVerdict(word: string): MimeBundle {
  return showInline(word);
}

/** A number with commas between thousands. */
export function inlineNumber(value: number | bigint): MimeBundle {
  return showInline(grouped(value));
}

/** A formula as mathematics; in plain text in Unicode. */
export function inlineFormula(formula: Formula): MimeBundle {
  return showInline(formulaOf(formula));
}

/** What the user wrote, on one line, in a fixed-width font. */
export function inlineText(text: string): MimeBundle {
  return showInline(code(text.replace(/\s+/g, " ")));
}

/** The axioms between braces, with their labels. */
export function inlineTheory(theory: Theory): MimeBundle {
  const mathematics = `$${printAxiomSet(theory, "latex")}$`;
  return {
    "text/plain": printAxiomSet(theory, "unicode"),
    "text/markdown": mathematics,
    "text/latex": mathematics,
  };
}

/** The structure as cell text; one with very many tuples by its size. */
export function inlineStructure(definition: StructureDefinition): MimeBundle {
  if (definition.carrier.kind !== "points")
    return showInline(
      cellOf(printStructureDefinition(definition, "unicode"), printStructureDefinition(definition, "latex")),
    );
  const structure = buildStructure(definition);
  const source = sourceOf(structure);
  return showInline(source === null ? `a structure on ${domainOf(structure)}` : code(source));
}

/** Why there is no finite model, as sentences for a draft; null when the answer does not rest on that. */
export function inlineReason(statement: Statement, answer: Answer): MimeBundle | null {
  const noFinite = "noFinite" in answer ? answer.noFinite : null;
  return noFinite === null ? null : showInline(...reasonParagraph(noFinite, axiomsAsked(statement)));
}
