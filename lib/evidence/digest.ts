/** The digest of a question. */
import { sha256 } from "@noble/hashes/sha2.js";
import { bytesToHex, utf8ToBytes } from "@noble/hashes/utils.js";
import type { FormulaRecord, QuestionRecord } from "./format.ts";

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
