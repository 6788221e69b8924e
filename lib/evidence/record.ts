/** Writing evidence: structures as records, and the digest of a question. */
import { sha256 } from "@noble/hashes/sha2.js";
import { bytesToHex, utf8ToBytes } from "@noble/hashes/utils.js";
import type { Structure } from "../carriers/structure.ts";
import type { FormulaRecord, QuestionRecord, StructureRecord, TableRecord } from "./format.ts";

export function recordStructure(structure: Structure): StructureRecord {
  const tables: Record<string, TableRecord> = {};
  for (const name of [...structure.tables.keys()].sort()) {
    const { relation, holds } = structure.tables.get(name)!;
    const kinds: number[] = [];
    holds.forEach((value, kind) => {
      if (value === 1) kinds.push(kind);
    });
    tables[name] = { places: relation.places, holds: kinds };
  }
  return { carrier: structure.carrier.description, tables };
}

/**
 * The digest by which stored evidence is known to belong to a question: of its JSON text with the sentences written out
 * in place of their numbers, and with the keys of every object in ascending order, since notebooks are stored with their
 * keys sorted. What a structure consists of stays as it is.
 */
export function digestOf(sentences: readonly FormulaRecord[], question: QuestionRecord): string {
  const writeOut = (value: unknown): unknown => {
    if (typeof value === "number") return sentences[value];
    return Array.isArray(value) ? value.map(writeOut) : value;
  };
  const entries = Object.entries(question).map(([key, value]) => [
    key,
    key === "structure" ? value : writeOut(value),
  ]);
  return bytesToHex(sha256(utf8ToBytes(JSON.stringify(withSortedKeys(Object.fromEntries(entries))))));
}

function withSortedKeys(value: unknown): unknown {
  if (typeof value !== "object" || value === null) return value;
  if (Array.isArray(value)) return value.map(withSortedKeys);
  const entries = Object.entries(value).sort(([a], [b]) => (a < b ? -1 : 1));
  return Object.fromEntries(entries.map(([key, part]) => [key, withSortedKeys(part)]));
}
