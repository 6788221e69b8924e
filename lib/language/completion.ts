/** What can be written at the cursor. */
import { proposeInStructure, structureBegun } from "./carrier-completion.ts";
import { carrierWords } from "./carriers.ts";
import { claimForms, normalFormHelp, optionHelp, statementHelp } from "./help.ts";
import { readTokens, type Token } from "./lexer.ts";
import type { NameKind, Names } from "./names.ts";
import { readCell } from "./parser.ts";
import { sentenceWords } from "./property-atoms.ts";
import { continuesLine, isStatementWord } from "./reader.ts";
import type { Scope } from "./statements.ts";
import { latexSpellings } from "./tokens.ts";

export { isComplete } from "./completeness.ts";
export { type Inspection, inspectAt } from "./inspection.ts";

export type MatchType = "statement" | "keyword" | "symbol" | "label" | NameKind;

export interface Match {
  readonly text: string;
  readonly type: MatchType;
}

/** Proposals for the stretch from `from` to `to`, in code points, in the order to be shown. */
export interface CompletionResult {
  readonly from: number;
  readonly to: number;
  readonly matches: readonly Match[];
}

/** The word before the cursor, with the hyphens that names and statements may have. */
const PARTIAL = /\p{L}[\p{L}\p{M}\p{Nd}'_-]*$/u;
/** Longer words are not completed. */
const LONGEST_WORD = 200;
const LATEX = /\\[a-zA-Z]*$/;

/**
 * Proposes what fits at the cursor and begins as the word before it does.
 * @param cursor in code points; taken as the nearest end if it lies outside the text
 */
export function completeAt(text: string, cursor: number, scope: Scope): CompletionResult {
  const points = [...text];
  const at = Math.max(0, Math.min(points.length, Math.floor(cursor)));
  const before = points.slice(0, at).join("");
  const nothing = { from: at, to: at, matches: [] };
  if (before.slice(before.lastIndexOf("\n") + 1).includes("#")) return nothing;
  const tail = points.slice(Math.max(0, at - LONGEST_WORD), at).join("");
  const command = LATEX.exec(tail)?.[0];
  if (command !== undefined) {
    const fitting = latexSpellings.filter(({ typed }) => typed.startsWith(command));
    const matches = fitting.map(({ symbol }): Match => ({ text: symbol, type: "symbol" }));
    return { from: at - command.length, to: at, matches: distinct(matches) };
  }
  const partial = PARTIAL.exec(tail)?.[0] ?? "";
  const { tokens, start } = statementBefore(before.slice(0, before.length - partial.length));
  const names = tokens.length === 0 ? null : readCell(before.slice(0, start), scope).names;
  const wanted = partial.toLowerCase();
  const matches = (names === null ? statementMatches() : matchesAfter(tokens, names)).filter(
    (match) => match.text !== partial && match.text.toLowerCase().startsWith(wanted),
  );
  return { from: at - [...partial].length, to: at, matches: distinct(matches) };
}

function distinct(matches: readonly Match[]): readonly Match[] {
  const seen = new Set<string>();
  return matches.filter(({ text }) => !seen.has(text) && seen.add(text) !== undefined);
}

/** The tokens of the statement that the end of a text is in, and where it begins in UTF-16 units. */
function statementBefore(text: string): { readonly tokens: readonly Token[]; readonly start: number } {
  // A word is put at the end, so that what it would belong to is told as for any other token.
  const all = readTokens(`${text}X`).slice(0, -1);
  let first = 0;
  let depth = 0;
  all.forEach((token, index) => {
    const last = all[index - 1];
    const isAnew =
      token.lineStart &&
      token.kind === "word" &&
      isStatementWord(token.text) &&
      all[index + 1]?.kind !== "colon";
    const isBorder =
      last !== undefined &&
      depth === 0 &&
      ((token.lineStart && !continuesLine(last)) || last.kind === "semicolon");
    if (isAnew || isBorder) {
      first = index;
      depth = 0;
    }
    if (token.kind === "open" || token.kind === "open-brace") depth += 1;
    if (token.kind === "close" || token.kind === "close-brace") depth = Math.max(0, depth - 1);
  });
  return { tokens: all.slice(first, -1), start: all[first]?.start ?? text.length };
}

function statementMatches(): readonly Match[] {
  return words(
    "statement",
    statementHelp.map((help) => help.word),
  );
}

function words(type: MatchType, texts: readonly string[]): readonly Match[] {
  return texts.map((text) => ({ text, type }));
}

const CARRIER_WORDS = words("keyword", carrierWords);
const THEORY_WORDS = words("keyword", ["converse", "complement"]);
const FORMULA_WORDS = words("keyword", ["exists", "false", "forall", "not", "true"]);

/** What fits after the tokens of a statement, of which there is at least one. */
function matchesAfter(tokens: readonly Token[], names: Names): readonly Match[] {
  const statement = tokens[0]!.text;
  const last = tokens.at(-1)!;
  const labels = labelsAfter(tokens, names);
  if (labels !== null) return words("label", labels);
  if (statement === "relation") return afterRelation(tokens, last);
  const bracket = innermostBracket(tokens);
  if (tokens.some(({ kind }) => kind === "raw")) return [];
  const isAsked = tokens.some((token) => token.kind === "entails" || token.kind === "does-not-entail");
  const structure = isAsked ? null : structureBegun(tokens, names);
  if (bracket === "open-brace") return structure !== null ? [] : formulaMatches(names);
  if (structure !== null) return structureMatches(structure, names, statement);
  if (statement === "normalise") return afterNormalise(tokens, last, names);
  if (statement === "write" && tokens.some(({ text }) => text === "as"))
    return words("keyword", last.text === "as" ? ["SMT-LIB", "DIMACS of size"] : []);
  if (isAsked) {
    if (!endsOperand(last)) return formulaMatches(names);
    return [
      ...(statement === "write" ? words("keyword", ["as"]) : optionMatches(tokens, last)),
      ...formulaMatches(names),
    ];
  }
  switch (statement) {
    case "define":
      return tokens.some((token) => token.kind === "assign") ? afterAssign(last, names) : [];
    case "describe":
      return endsOperand(last) && tokens.length > 1
        ? words("keyword", ["replacing"])
        : [...listed(names, ["theory", "structure", "formula", "relation"]), ...CARRIER_WORDS];
    case "claim":
    case "conjecture":
      return afterClaim(tokens, last, names);
    case "count":
      return last.text === "with"
        ? words("keyword", ["representatives"])
        : [
            ...afterTheory(tokens, last, names, []),
            ...(endsOperand(last) && tokens.length > 1 && !tokens.some(({ text }) => text === "with")
              ? words("keyword", ["with representatives"])
              : []),
          ];
    case "write":
      return afterTheory(tokens, last, names, ["⊨", "as"]).filter(
        ({ text }) => !optionHelp.some(({ form }) => form.startsWith(text)),
      );
    default:
      return afterTheory(tokens, last, names, statement === "models" ? ["of size"] : []);
  }
}

function afterNormalise(tokens: readonly Token[], last: Token, names: Names): readonly Match[] {
  const to = tokens.findLastIndex((token) => token.text === "to" && token.kind === "word");
  if (to < 0 || innermostBracket(tokens) !== null)
    return [
      ...(endsOperand(last) && tokens.length > 1 ? words("keyword", ["to"]) : []),
      ...formulaMatches(names),
    ];
  if (last.text === "to")
    return words(
      "keyword",
      normalFormHelp.map(({ phrase }) => phrase.join(" ")),
    );
  if (last.text === "with") return words("keyword", ["steps"]);
  return words("keyword", last.text === "form" ? ["with steps"] : ["form", "with steps"]);
}

function listed(names: Names, kinds: readonly NameKind[]): readonly Match[] {
  return names.list(kinds).map(({ name, kind }) => ({ text: name, type: kind }));
}

function formulaMatches(names: Names): readonly Match[] {
  return [
    ...listed(names, ["relation", "formula", "theory"]),
    ...FORMULA_WORDS,
    ...words("keyword", sentenceWords),
    ...words("keyword", ["id", "full", "none", "inv", "co"]),
  ];
}

/** The labels that can follow `T.`, `T -`, `T replacing`; null elsewhere. */
function labelsAfter(tokens: readonly Token[], names: Names): readonly string[] | null {
  const last = tokens.at(-1)!;
  const isLabel = last.kind === "dot" || last.kind === "minus" || last.text === "replacing";
  if (!isLabel) return null;
  const used = new Set<string>();
  // Back over `- label` to the name of the theory.
  let at = tokens.length - 2;
  while (tokens[at - 1]?.kind === "minus" && tokens[at]?.kind === "word") {
    used.add(tokens[at]!.text);
    at -= 2;
  }
  const named = names.find(tokens[at]?.text ?? "");
  if (named?.kind !== "theory") return null;
  return named.definition.theory.axioms.map((axiom) => axiom.label).filter((label) => !used.has(label));
}

function afterRelation(tokens: readonly Token[], last: Token): readonly Match[] {
  if (tokens.length === 1 || last.kind === "comma" || last.text === "of") return [];
  if (last.kind === "number") return words("keyword", last.text === "1" ? ["place"] : ["places"]);
  return words("keyword", ["infix", "of"]);
}

/** In a structure that is written out, and after one in a claim. */
function structureMatches(structure: readonly Token[], names: Names, statement: string): readonly Match[] {
  const proposals = proposeInStructure(structure, names);
  const signs = { claim: ["⊨", "⊭"], conjecture: ["⊨", "⊭"], write: ["⊨"] }[statement] ?? [];
  return [
    ...(proposals.relations ? listed(names, ["relation"]) : []),
    ...words("keyword", proposals.words),
    ...(proposals.words.includes("and") ? words("symbol", signs) : []),
  ];
}

function afterAssign(last: Token, names: Names): readonly Match[] {
  if (last.kind !== "assign")
    return [...(endsOperand(last) ? words("keyword", ["replacing"]) : []), ...formulaMatches(names)];
  return [
    ...listed(names, ["theory", "structure", "formula", "relation"]),
    ...THEORY_WORDS,
    ...CARRIER_WORDS,
    ...words("keyword", ["smt-lib"]),
    ...FORMULA_WORDS,
    ...words("keyword", sentenceWords),
  ];
}

function afterClaim(tokens: readonly Token[], last: Token, names: Names): readonly Match[] {
  const rest: string[] = [];
  for (const { phrase } of claimForms)
    for (let length = 1; length < phrase.length; length += 1) {
      const said = tokens.slice(-length).map((token) => token.text);
      if (said.join(" ") === phrase.slice(0, length).join(" ")) rest.push(phrase.slice(length).join(" "));
    }
  if (rest.length > 0) return words("keyword", rest.sort());
  const isDone = tokens.some((token) => token.text === "is" || token.text === "has");
  if (tokens.length === 1)
    return [...listed(names, ["theory", "structure"]), ...THEORY_WORDS, ...CARRIER_WORDS];
  return afterTheory(tokens, last, names, isDone ? [] : ["⊨", "⊭", "has", "is"]);
}

/** Inside or after a theory expression; `after` is what the statement asks for when it is complete. */
function afterTheory(
  tokens: readonly Token[],
  last: Token,
  names: Names,
  after: readonly string[],
): readonly Match[] {
  if (!endsOperand(last) || tokens.length === 1 || last.text === "than" || last.text === "to") {
    if (tokens.at(-2)?.text === "up") return [];
    return [...listed(names, ["theory"]), ...THEORY_WORDS];
  }
  const phrases = after.map((text): Match => ({ text, type: /\p{L}/u.test(text) ? "keyword" : "symbol" }));
  const hasOption = tokens.some(({ text }) => optionHelp.some(({ word }) => word === text));
  const goOn = hasOption ? [] : [...phrases, ...words("keyword", ["replacing"])];
  return [...goOn, ...optionMatches(tokens, last)];
}

function optionMatches(tokens: readonly Token[], last: Token): readonly Match[] {
  if (last.text === "up") return words("keyword", ["to"]);
  if (last.text === "within") return [];
  if (last.kind === "number" && tokens.at(-2)?.text === "within") return words("keyword", ["steps"]);
  const free = optionHelp.filter(({ word }) => !tokens.some((token) => token.text === word));
  return words(
    "keyword",
    free.map(({ word }) => (word === "up" ? "up to" : word)),
  );
}

function endsOperand(token: Token): boolean {
  return ["word", "number", "close", "close-brace", "true", "false"].includes(token.kind);
}

function innermostBracket(tokens: readonly Token[]): Token["kind"] | null {
  const open: Token["kind"][] = [];
  for (const { kind } of tokens) {
    if (kind === "open" || kind === "open-brace") open.push(kind);
    if (kind === "close" || kind === "close-brace") open.pop();
  }
  return open.includes("open-brace") ? "open-brace" : (open.at(-1) ?? null);
}
