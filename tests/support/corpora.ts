/** The check values of tests/data, read into theories and sentences; each test names the source it relies on. */
import { readFileSync } from "node:fs";
import { join } from "node:path";
import { parseFormula } from "../../lib/language/parser.ts";
import { emptyScope, type Scope } from "../../lib/language/statements.ts";
import type { Formula, RelationSymbol } from "../../lib/logic/formula.ts";
import type { Theory } from "../../lib/logic/theory.ts";

function load(name: string): unknown {
  return JSON.parse(readFileSync(join(import.meta.dirname, "..", "data", name), "utf8"));
}

export type Expected = "holds" | "fails" | "only infinite countermodels";

export interface ClaimEntry {
  readonly id: string;
  readonly premises: readonly string[];
  readonly conclusion: string;
  readonly expected: Expected;
  readonly smallest_countermodel?: { readonly points: number; readonly R: readonly (readonly number[])[] };
  readonly countermodel_status?: string;
}

export interface QuestionEntry {
  readonly id: string;
  readonly premises: readonly string[];
  readonly conclusion: string;
  readonly expected: Expected;
  readonly smallest_countermodel_points?: number;
}

export interface ValueEntry {
  readonly id: string;
  readonly category: string;
  readonly statement: unknown;
  readonly expected: unknown;
  readonly [key: string]: unknown;
}

export const claims = (load("claims.json") as { claims: ClaimEntry[] }).claims;
export const questions = (load("questions.json") as { questions: QuestionEntry[] }).questions;
export const infiniteOnly = (load("infinite-only.json") as { entries: { id: string; axioms: string[] }[] })
  .entries;
const valueFile = load("values.json") as { property_codes: Record<string, string>; values: ValueEntry[] };
export const values = valueFile.values;
export const propertyCodes = valueFile.property_codes;

/** The entry with an id, which must be there. */
export function entryOf(id: string): ValueEntry {
  const entry = values.find((candidate) => candidate.id === id);
  if (entry === undefined) throw new Error(`no entry ${id}`);
  return entry;
}

/** The relations of some sentences, in the notation of the files: a capital letter, then its arguments. */
function scopeOf(texts: readonly string[]): Scope {
  const relations = new Map<string, RelationSymbol>();
  for (const text of texts)
    for (const [, name, args] of text.matchAll(/\b([A-Z])\(([^()]*)\)/g))
      relations.set(name!, { name: name!, places: args!.split(",").length, infix: false });
  return relations.size === 0 ? emptyScope : { ...emptyScope, declared: [...relations.values()] };
}

/** Reads sentences that belong together. */
export function readSentences(texts: readonly string[]): Formula[] {
  const scope = scopeOf(texts);
  return texts.map((text) => {
    const result = parseFormula(text, scope);
    if ("diagnostics" in result) throw new Error(`${text}: ${result.diagnostics[0]?.message}`);
    return result.formula;
  });
}

/** A theory of sentences, labelled a1, a2, … or as given. */
export function theoryOf(sentences: readonly Formula[], labels?: readonly string[]): Theory {
  const axioms = sentences.map((formula, index) => ({
    label: labels?.[index] ?? `a${index + 1}`,
    formula,
    named: labels !== undefined,
  }));
  return { axioms, fallback: { name: "R", places: 2, infix: false } };
}

/** Reads the theory of some sentences. */
export function readTheory(texts: readonly string[], labels?: readonly string[]): Theory {
  return theoryOf(readSentences(texts), labels);
}

/** The sentences of a property of category b, by its two-letter code. */
export function propertySentences(code: string): string[] {
  const definitions = entryOf("b-definitions").expected as Record<string, { definition: string }>;
  const text = propertyCodes[code] ?? definitions[code]?.definition;
  if (text === undefined) throw new Error(`no property ${code}`);
  return text.split(" and ");
}
