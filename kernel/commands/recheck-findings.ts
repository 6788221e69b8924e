/** What `describe` is stored to have found out about named properties, held against its evidence. */
import { buildCarrier } from "../../lib/carriers/build.ts";
import type { Evidence, FormulaRecord } from "../../lib/evidence/format.ts";
import type { ModelSearch } from "../../lib/inquiry/examine.ts";
import { type Formula, not } from "../../lib/logic/formula.ts";
import { findProperty, propertyOf } from "../../lib/logic/properties.ts";
import { recordFormula } from "../../lib/logic/records/formulas.ts";
import { type Theory, theorySignature } from "../../lib/logic/theory.ts";
import { propertyStatus } from "../display/findings.ts";

interface StoredSearch {
  readonly size?: unknown;
  readonly infinite?: unknown;
  readonly noneUpTo?: unknown;
  readonly decided?: unknown;
}
interface StoredFinding {
  readonly property?: unknown;
  readonly status?: unknown;
  readonly modelWith?: StoredSearch | null;
  readonly modelWithout?: StoredSearch | null;
}

/**
 * Why the evidence does not show what is stored, or null.
 * @param damaged what to say when the data have another form
 */
export function findOtherFindings(
  theory: Theory,
  properties: readonly object[],
  evidence: Evidence,
  damaged: string,
): string | null {
  for (const { property, status, modelWith, modelWithout } of properties as readonly StoredFinding[]) {
    const sentence = sentenceOfProperty(String(property), theory);
    if (sentence === null) return `\`${property}\` is no property of a relation of the theory`;
    const [having, lacking] = [searchOf(modelWith), searchOf(modelWithout)];
    if (having === null || lacking === null) return damaged;
    const isShown = (wanted: Formula, search: ModelSearch) =>
      search.kind !== "found" || hasModel(evidence, wanted, search.size);
    if (!isShown(sentence, having) || !isShown(not(sentence), lacking))
      return `no structure of the evidence shows what is stored of \`${property}\``;
    if (
      (lacking.kind === "derived" && !hasDerivation(evidence, not(not(sentence)))) ||
      (having.kind === "derived" && !hasDerivation(evidence, not(sentence)))
    )
      return `no derivation of the evidence shows what is stored of \`${property}\``;
    const own = propertyStatus({ name: String(property), having, lacking });
    if (status !== own)
      return `\`${property}\` is stored as ${String(status)}, and what was found makes it ${own}`;
  }
  return null;
}

/** What a search came to, as it was stored; null when it has another form. */
function searchOf(stored: StoredSearch | null | undefined): ModelSearch | null {
  if (typeof stored !== "object" || stored === null) return null;
  const { size, infinite, noneUpTo, decided } = stored;
  if (typeof decided !== "boolean") return null;
  if (infinite !== undefined)
    return infinite === true && size === null ? { kind: "found", size: null } : null;
  if (typeof size === "number") return { kind: "found", size };
  if (size !== null) return null;
  if (noneUpTo === null) return decided ? { kind: "derived" } : null;
  return typeof noneUpTo === "number" ? { kind: "none", upTo: noneUpTo, decided: null } : null;
}

/** The sentence that a property, written `transitive(R)`, is of a relation of the theory; null when it is none. */
function sentenceOfProperty(text: string, theory: Theory): Formula | null {
  const [, name, of] = /^([^()]+)\((.*)\)$/.exec(text) ?? [];
  const property = findProperty(name ?? "");
  const relation = theorySignature(theory).relations.find((one) => one.name === of && one.places === 2);
  return property === undefined || relation === undefined ? null : propertyOf(property, relation);
}

function indexOf({ sentences }: Evidence, formula: Formula): number {
  const text = JSON.stringify(recordFormula(formula));
  return sentences.findIndex((sentence: FormulaRecord) => JSON.stringify(sentence) === text);
}

/** @param size null for an infinite one */
function hasModel(evidence: Evidence, formula: Formula, size: number | null): boolean {
  const index = indexOf(evidence, formula);
  return evidence.facts.some(
    (fact) =>
      fact.fact === "structure" &&
      buildCarrier(fact.structure.carrier).size === size &&
      fact.holds.includes(index),
  );
}

function hasDerivation(evidence: Evidence, formula: Formula): boolean {
  const index = indexOf(evidence, formula);
  return evidence.facts.some(
    (fact) => fact.fact === "derivation" && (fact.conclusion === null || fact.conclusion === index),
  );
}
