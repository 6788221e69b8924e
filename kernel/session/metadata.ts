/** How a statement's result and its evidence stand in the metadata of its output. */
import { deflateSync, inflateSync } from "node:zlib";
import type { StatementResult } from "./evaluator.ts";

/** Characters of evidence, as JSON, beyond which it is stored compressed. */
const COMPRESSED_FROM = 64 * 1024;

/** Bytes of evidence beyond which it is taken for damaged: a few compressed bytes can be made to stand for very many. */
const LARGEST_EVIDENCE = 256 * 1024 * 1024;

/** Evidence as stored: itself, or `{"deflate": …}` with its JSON text, compressed (RFC 1950) and in base 64. */
export type StoredEvidence = StatementResult["evidence"] | { readonly deflate: string };

/** The value of the key `twoplace` in an output's metadata. */
export function storeResult(result: StatementResult): Readonly<Record<string, unknown>> {
  const text = JSON.stringify(result.evidence);
  const evidence: StoredEvidence =
    text.length > COMPRESSED_FROM ? { deflate: deflateSync(text).toString("base64") } : result.evidence;
  return { ...result, evidence };
}

/** The evidence of a stored result, decompressed where needed. @throws Error when it is damaged */
export function loadEvidence(stored: unknown): unknown {
  if (typeof stored !== "object" || stored === null || !("deflate" in stored)) return stored;
  const bytes = Buffer.from(String(stored.deflate), "base64");
  return JSON.parse(inflateSync(bytes, { maxOutputLength: LARGEST_EVIDENCE }).toString("utf8"));
}
