/** Short values for the middle of sentences: a verdict, a count, a formula. */
import type { Formula } from "../../lib/logic/formula.ts";
import type { MimeBundle } from "../session/evaluator.ts";
import { formulaOf } from "./blocks.ts";
import { showInline } from "./bundle.ts";
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
