/** Names that a cell binds: what may be one. */
import type { Place } from "./diagnostics.ts";
import { isRelationSign, type Token } from "./lexer.ts";
import { isKeptWord, isVariable } from "./names.ts";
import { quote, type Reader } from "./reader.ts";
import { keptSymbols, mistakenSigns } from "./tokens.ts";
import { kindText } from "./wording.ts";

/** A word or symbol that is to become a name. */
export type NewName = Place & Pick<Token, "text" | "kind">;

/** Reports what stands where a name is due. */
export function failName(reader: Reader, what: string): never {
  const token = reader.peek();
  if (token.kind === "number" || token.kind === "end" || token.kind === "unknown")
    return reader.failExpected(`the name of a ${what}`);
  if (token.kind === "relation-sign")
    return reader.fail(
      "not-a-name",
      token,
      `${quote(token.text)} is a symbol, and the name of a ${what} begins with a letter`,
      "take another name",
    );
  return reader.fail(
    "kept-word",
    token,
    `${quote(token.text)} is a sign of the language and cannot be the name of a ${what}`,
    "take another name",
  );
}

/** Reports whatever keeps a word or symbol from becoming a name. */
export function checkNewName(reader: Reader, name: NewName, what: "relation" | "definition"): void {
  const problem = findNameProblem(reader, name, what);
  if (problem !== null) reader.report(problem.code, name, problem.message, problem.suggestion);
}

function findNameProblem(
  reader: Reader,
  { text, kind }: Pick<Token, "text" | "kind">,
  what: "relation" | "definition",
): { readonly code: string; readonly message: string; readonly suggestion: string } | null {
  const shown = quote(text);
  const suggestion = "take another name";
  if (isVariable(text))
    return {
      code: "variable-as-name",
      message: `${shown} is a variable and cannot be the name of a ${what}`,
      suggestion: `begin with a capital letter, \`${text[0]!.toUpperCase()}${text.slice(1)}\`, or use a longer word`,
    };
  if (keptSymbols.has(text)) {
    const message = `${shown} is kept for relation terms and cannot be the name of a ${what}`;
    return { code: "kept-word", message, suggestion };
  }
  if (kind === "relation-sign" && !isRelationSign(text)) {
    const message = `${shown} is too like ${mistakenSigns.get(text) ?? "a sign of the language"} to be the name of a ${what}`;
    return { code: "kept-word", message, suggestion };
  }
  if (isKeptWord(text)) {
    const message = `${shown} is a word of the language and cannot be the name of a ${what}`;
    return { code: "kept-word", message, suggestion };
  }
  const named = reader.names.find(text);
  if (named === null || named.kind === "damaged") return null;
  const isRelation = named.kind === "relation";
  if (isRelation === (what === "relation")) return null;
  const message =
    isRelation && !reader.names.isDeclared
      ? `${shown} is the relation that is there while none is declared`
      : `${shown} is already ${kindText(named.kind)}`;
  return { code: "name-taken", message, suggestion };
}
