/** Theories written out in tests. */
import type { Formula } from "../../lib/logic/formula.ts";
import type { Theory } from "../../lib/logic/theory.ts";

/** The theory with these axioms under these labels. */
export function theoryFrom(axioms: Readonly<Record<string, Formula>>): Theory {
  return {
    axioms: Object.entries(axioms).map(([label, formula]) => ({ label, formula, named: true })),
    fallback: { name: "R", places: 2, infix: false },
  };
}
