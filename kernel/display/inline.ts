/** Short values for the middle of sentences: a verdict, a count, a formula, and what a name stands for. */
import { buildStructure } from "../../lib/carriers/defined.ts";
import { printAxiomSet } from "../../lib/language/printer.ts";
import type { Formula } from "../../lib/logic/formula.ts";
import type { StructureDefinition } from "../../lib/logic/structure-definition.ts";
import type { Theory } from "../../lib/logic/theory.ts";
import type { MimeBundle } from "../session/evaluator.ts";
import { code, formulaOf } from "./blocks.ts";
import { showInline } from "./bundle.ts";
import { domainOf, sourceOf } from "./structures.ts";
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
  const structure = buildStructure(definition);
  const source = sourceOf(structure);
  return showInline(source === null ? `a structure on ${domainOf(structure)}` : code(source));
}
