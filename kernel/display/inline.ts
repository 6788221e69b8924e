/** Short values for the middle of sentences: a verdict, a count, a formula, a theory. */
import { buildStructure } from "../../lib/carriers/structure.ts";
import type { Formula } from "../../lib/logic/formula.ts";
import type { StructureDefinition } from "../../lib/logic/structure-definition.ts";
import type { Theory } from "../../lib/logic/theory.ts";
import type { MimeBundle } from "../session/evaluator.ts";
import { code, formulaOf, type Inline } from "./blocks.ts";
import { showInline } from "./bundle.ts";
import { sourceOf } from "./structures.ts";
import { counted, grouped } from "./text.ts";

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

/** Cell text, as the user wrote it. */
export function inlineText(text: string): MimeBundle {
  return showInline(code(text.replace(/\s+/g, " ")));
}

/** The axioms with their labels, one after another. */
export function inlineTheory({ axioms }: Theory): MimeBundle {
  if (axioms.length === 0) return showInline("no axioms");
  const parts = axioms.flatMap(({ label, formula }, index): Inline[] => [
    index === 0 ? "" : "; ",
    code(label),
    ": ",
    formulaOf(formula),
  ]);
  return showInline(...parts);
}

/** A structure as cell text, or by its size where that would be long. */
export function inlineStructure(definition: StructureDefinition): MimeBundle {
  const source = sourceOf(buildStructure(definition));
  return source === null
    ? showInline(`a structure on ${counted(definition.carrier.size, "point")}`)
    : showInline(code(source));
}
