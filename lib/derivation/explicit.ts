/**
 * Explicit definitions among formulas, and the formulas with the defined relations written out. Most premises of the
 * shape ∀x … (R(x, …) ↔ φ) are abbreviations; a search that starts from what they abbreviate has fewer clauses to
 * combine, and shorter ones.
 */

import type { TermFormulaRecord } from "../evidence/format.ts";
import { freeVariables } from "../logic/records/formulas.ts";

/** What a formula ∀x … (R(x, …) ↔ φ) defines, R not being in φ. */
export interface ExplicitDefinition {
  /** The formula, by number. */
  readonly number: number;
  /** Name and number of places, as {@link relationsIn} writes them. */
  readonly relation: string;
  /** The relations of φ. */
  readonly uses: ReadonlySet<string>;
}

/** The relations of a formula, each as its name, a slash and its number of places. */
export function relationsIn(formula: TermFormulaRecord): ReadonlySet<string> {
  const found = new Set<string>();
  collect(formula, found);
  return found;
}

function collect(formula: TermFormulaRecord, found: Set<string>): void {
  switch (formula[0]) {
    case "is":
      found.add(`${formula[1]}/${formula.length - 2}`);
      break;
    case "forall":
    case "exists":
      collect(formula[2], found);
      break;
    case "not":
      collect(formula[1], found);
      break;
    case "and":
    case "or":
    case "implies":
    case "iff":
      for (const part of formula.slice(1) as TermFormulaRecord[]) collect(part, found);
      break;
    default:
  }
}

/** What the formula defines explicitly; null when it does not have the shape. */
export function explicitDefinition(formula: TermFormulaRecord, number: number): ExplicitDefinition | null {
  const bound: string[] = [];
  let body = formula;
  while (body[0] === "forall") {
    bound.push(body[1]);
    body = body[2];
  }
  if (body[0] !== "iff" || body[1][0] !== "is") return null;
  const [, name, ...args] = body[1];
  const variables = new Set(args);
  const isGeneral =
    args.every((arg) => typeof arg === "string" && bound.includes(arg)) &&
    variables.size === args.length &&
    bound.length === args.length &&
    freeVariables(body[2]).every((variable) => variables.has(variable));
  if (!isGeneral) return null;
  const relation = `${name}/${args.length}`;
  const uses = relationsIn(body[2]);
  return uses.has(relation) ? null : { number, relation, uses };
}

/**
 * Definitions that can all be unfolded: at most one for each relation, and none that leads back to its own relation.
 * Each comes after those whose relations it uses.
 * @param candidates in the order of preference
 */
export function orderDefinitions(candidates: readonly ExplicitDefinition[]): readonly ExplicitDefinition[] {
  const chosen = new Map<string, ExplicitDefinition>();
  const reaches = (from: ExplicitDefinition, relation: string): boolean =>
    [...from.uses].some((used) => {
      const next = chosen.get(used);
      return used === relation || (next !== undefined && reaches(next, relation));
    });
  for (const candidate of candidates)
    if (!chosen.has(candidate.relation) && !reaches(candidate, candidate.relation))
      chosen.set(candidate.relation, candidate);
  const ordered = new Set<ExplicitDefinition>();
  const place = (definition: ExplicitDefinition): void => {
    if (ordered.has(definition)) return;
    for (const used of definition.uses) {
      const earlier = chosen.get(used);
      if (earlier !== undefined) place(earlier);
    }
    ordered.add(definition);
  };
  for (const definition of chosen.values()) place(definition);
  return [...ordered];
}
