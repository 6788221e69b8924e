/** Which kind of expression comes next, where several may. */
import { isCarrierAhead } from "./carriers.ts";
import { isSmtLib, type Token } from "./lexer.ts";
import { isKeptWord, isVariable } from "./names.ts";
import { isPropertyWord } from "./property-atoms.ts";
import type { Reader } from "./reader.ts";

/** `relation`: the bare name of one; `unknown`: a bare name that is unknown, or damaged and of no known kind. */
export type ExpressionKind = "theory" | "structure" | "formula" | "relation" | "unknown";

const THEORY_WORDS = new Set(["replacing", "is", "has"]);

/** Tells the kind by the first tokens, without reading them. */
export function expressionAhead(reader: Reader): ExpressionKind {
  if (isCarrierAhead(reader)) return "structure";
  let at = 0;
  while (reader.peekAfter(at).kind === "open") at += 1;
  const token = reader.peekAfter(at);
  const after = reader.peekAfter(at + 1);
  if (token.kind === "open-brace") return "theory";
  if (token.kind === "relation-sign") return at === 0 && ends(after) ? "relation" : "formula";
  if (at === 0 && isSmtLib(token) && after.kind === "open-brace") return "theory";
  if (token.kind === "word" && isPropertyWord(token.text) && reader.names.find(token.text) === null)
    return "formula";
  if (token.kind !== "word" || token.group) return token.group ? kindOfName(reader, token, at) : "formula";
  if ((token.text === "converse" || token.text === "complement") && after.kind === "open") return "theory";
  return kindOfName(reader, token, at);
}

function kindOfName(reader: Reader, token: Token, at: number): ExpressionKind {
  const after = reader.peekAfter(at + 1);
  const named = reader.names.find(token.text);
  switch (named?.kind) {
    case "relation":
      return at === 0 && ends(after) ? "relation" : "formula";
    case "formula":
    case "structure":
      return named.kind;
    case "theory":
      return isSentence(reader, at) ? "formula" : "theory";
    case "damaged":
      if (named.as === "theory") return isSentence(reader, at) ? "formula" : "theory";
      if (named.as !== null) return named.as;
      break;
    default:
  }
  if (isTheoryOperator(after)) return "theory";
  if (named !== undefined && named !== null) return ends(after) ? "unknown" : "formula";
  const isFormula =
    isVariable(token.text) || isKeptWord(token.text) || /^\p{Lu}[a-z0-9']+$/u.test(token.text);
  if (!ends(after)) return "formula";
  // A bare `Sxy` is an atom of an unknown relation unless it resembles a name.
  const near = reader.names.nearest(token.text, ["relation", "formula", "theory", "structure"]);
  return isFormula && near === null && token.text.length <= 4 ? "formula" : "unknown";
}

function isTheoryOperator(token: Token): boolean {
  if (token.lineStart) return false;
  if (token.kind === "word") return THEORY_WORDS.has(token.text);
  return ["plus", "minus", "dot", "entails", "does-not-entail"].includes(token.kind);
}

function ends(token: Token): boolean {
  return token.kind === "end" || token.kind === "semicolon" || token.lineStart;
}

/** Whether `T.label` at a place is used as a sentence: a connective follows it. */
function isSentence(reader: Reader, at: number): boolean {
  let next = at + 1;
  if (reader.peekAfter(next).kind !== "dot") return false;
  next += 2;
  while (reader.peekAfter(next).kind === "close") next += 1;
  const token = reader.peekAfter(next);
  return !token.lineStart && ["and", "or", "implies", "iff"].includes(token.kind);
}
