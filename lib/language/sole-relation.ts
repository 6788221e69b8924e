/**
 * Properties without a relation: in `{ irr: ∀x ¬Rxx; transitive }` the bare name is said of the one relation that
 * the theory is about. Which one that is, is known only when the theory has been read; until then the formula has a
 * stand-in for it.
 */
import { atom, type Formula, mapAtoms, type RelationSymbol, relationsOf } from "../logic/formula.ts";
import { listWords } from "./help.ts";
import type { Token } from "./lexer.ts";
import { quote, type Reader } from "./reader.ts";

/** Stands for the relation still to be told; no declared relation has an empty name. */
export const standIn: RelationSymbol = { name: "", places: 2, infix: false };

/**
 * Tells the relation that bare properties are said of: of the relations with two places in what they belong to, or
 * if there are none of those in scope, the only one.
 * @param bare the names of properties that were used without a relation; at least one
 * @param about the relations of what they belong to
 * @returns null after a report that there is none, or more than one
 */
export function findSoleRelation(
  reader: Reader,
  bare: readonly Token[],
  about: readonly RelationSymbol[],
): RelationSymbol | null {
  const own = twoPlaced(about);
  const candidates = own.length > 0 ? own : twoPlaced(reader.names.relations);
  const [only] = candidates;
  if (candidates.length === 1) return only!;
  const name = bare[0]!.text;
  if (only === undefined)
    reader.report(
      "which-relation",
      bare[0]!,
      `${quote(name)} is said of a relation of 2 places, and there is none`,
      "declare one: `relation R`",
    );
  else {
    const names = candidates.map((relation) => relation.name);
    const shown = names.length > 8 ? [...names.slice(0, 8).map(quote), "others"] : names.map(quote);
    reader.report(
      "which-relation",
      bare[0]!,
      `${quote(name)} could be said of ${listWords(shown, "or")}`,
      `write \`${name}(${names[0]})\``,
    );
  }
  return null;
}

function twoPlaced(relations: readonly RelationSymbol[]): readonly RelationSymbol[] {
  const found = new Map<string, RelationSymbol>();
  for (const relation of relations)
    if (relation.places === 2 && relation.name !== standIn.name) found.set(relation.name, relation);
  return [...found.values()];
}

/** The formula with the relation in place of the stand-in. */
export function putRelation(formula: Formula, relation: RelationSymbol): Formula {
  return mapAtoms(formula, (part) =>
    part.relation.name === standIn.name ? atom(relation, ...part.args) : part,
  );
}

/** The relations of a formula, whether its bare properties have been settled or not. */
export function declaredIn(formula: Formula): readonly RelationSymbol[] {
  return relationsOf(formula).filter(({ name }) => name !== standIn.name);
}
