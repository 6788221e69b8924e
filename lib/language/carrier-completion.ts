/** What can be written next in a structure on an infinite domain. */
import { GENERIC_CLASSES } from "../logic/structure-definition.ts";
import { elementHelp } from "./carrier-help.ts";
import { beginsCarrier, carrierWords, isWord } from "./carriers.ts";
import { readTokens, type Token } from "./lexer.ts";
import { isKeptWord, isVariable, type Names } from "./names.ts";

/** Words, and names of relations. */
export interface StructureProposals {
  readonly words: readonly string[];
  readonly relations: boolean;
}

const nothing: StructureProposals = { words: [], relations: false };
const END = readTokens("")[0]!;

/** The tokens of a structure that a statement has begun to write out; null when it has not. */
export function structureBegun(tokens: readonly Token[], names: Names): readonly Token[] | null {
  const assign = tokens.findIndex(({ kind }) => kind === "assign");
  const isOther = ["claim", "conjecture", "describe", "write"].includes(tokens[0]?.text ?? "");
  const from = assign >= 0 ? assign + 1 : isOther ? 1 : tokens.length;
  // The words before the cursor may be the beginning of what tells a carrier from a name.
  const partial = ["generic", "rooted", "tree", "tuples", "sum"];
  const [first] = tokens.slice(from);
  const isBegun =
    beginsCarrier((count) => tokens[from + count] ?? END, names) ||
    (first?.kind === "number" && from === tokens.length - 1) ||
    (first !== undefined &&
      isWord(first, ...partial) &&
      from === tokens.length - 1 &&
      names.find(first.text) === null);
  return isBegun ? tokens.slice(from) : null;
}

/** What fits after the tokens of a structure, of which there is at least one. */
export function proposeInStructure(tokens: readonly Token[], names: Names): StructureProposals {
  const where = tokens.findIndex((token) => isWord(token, "where"));
  if (where < 0) return inCarrier(tokens);
  const carrier = tokens.slice(0, where);
  const said = tokens.slice(where + 1);
  const last = said.at(-1);
  if (last === undefined) return { words: [], relations: true };
  if (last.kind === "dot") return { words: componentsOf(carrier), relations: false };
  const start = said.findLastIndex((token, at) => token.kind === "comma" && depthAt(said, at) === 0);
  const own = said.slice(start + 1);
  const isSaid = own.some((token) => isWord(token, "iff", "is"));
  if (!isSaid) {
    const isHead = own.length > 0 && own.at(-1)!.kind !== "open" && own.at(-1)!.kind !== "and";
    const isListed = isWord(tokens[0]!, "points") && where === 2;
    return isHead
      ? { words: isListed ? ["is", "iff"] : ["iff"], relations: false }
      : { words: [], relations: true };
  }
  if (own.some((token) => isWord(token, "is"))) return { words: [], relations: last.kind === "and" };
  const isOperand = ["word", "number", "close", "true", "false"].includes(last.kind) && !isWord(last, "iff");
  const isVariableOrNumber = last.kind === "number" || (last.kind === "word" && isVariable(last.text));
  if (isOperand)
    return isVariableOrNumber || last.kind === "close" ? { words: ["and", "or"], relations: false } : nothing;
  return {
    words: [...elementWords(carrier), "not", "true", "false"],
    relations: last.kind === "and" && names.relations.length > 0,
  };
}

function inCarrier(tokens: readonly Token[]): StructureProposals {
  const last = tokens.at(-1)!;
  const before = tokens.at(-2);
  const goesOn = ["at each point of", "where"];
  const say = (...words: readonly string[]) => ({ words, relations: false });
  if (last.kind === "open" || (last.kind === "and" && tokens.some((token) => isWord(token, "sum"))))
    return say(...carrierWords);
  if (last.kind === "comma")
    return tokens.some((token) => isWord(token, "sum")) ? say(...carrierWords) : nothing;
  if (last.kind === "close") return isNaming(tokens) ? say("over") : say(...goesOn);
  if (last.kind === "number") {
    if (before === undefined || before.kind === "open")
      return say(last.text === "1" ? "copy of" : "copies of");
    if (isWord(before, "points")) return say(...goesOn);
    if (isWord(before, "in")) return say("colours");
    if (isWord(before, "with")) return isTreeBefore(tokens) ? say("children") : say("points");
    return tokens.some((token) => isWord(token, "tuples")) ? say("over") : nothing;
  }
  switch (last.text) {
    case "dense-line":
      return say("in", ...goesOn);
    case "boolean-algebra":
      return say("without zero", "without zero and top", ...goesOn);
    case "zero":
      return say("and top", ...goesOn);
    case "generic":
      return say(...GENERIC_CLASSES);
    case "rooted":
      return say("tree with");
    case "tree":
    case "forest":
      return say("with");
    case "tuples":
    case "sum":
      return say("of");
    case "copy":
    case "copies":
      return say("of");
    case "of":
      return before !== undefined && isWord(before, "tuples") ? nothing : say(...carrierWords);
    case "over":
      return say(...carrierWords);
    case "at":
      return say("each point of");
    case "each":
      return say("point of");
    case "without":
      return say("zero", "zero and top");
    case "in":
    case "with":
    case "points":
      return nothing;
    default:
      return say(...goesOn);
  }
}

function isNaming(tokens: readonly Token[]): boolean {
  let depth = 0;
  for (let at = tokens.length - 1; at >= 0; at -= 1) {
    if (tokens[at]!.kind === "close") depth += 1;
    if (tokens[at]!.kind === "open") depth -= 1;
    if (depth === 0) {
      const before = tokens[at - 1];
      return (
        before !== undefined &&
        (isWord(before, "tuples") || before.kind === "comma") &&
        tokens.some((token) => isWord(token, "tuples"))
      );
    }
  }
  return false;
}

function isTreeBefore(tokens: readonly Token[]): boolean {
  const before = tokens.at(-3);
  return before !== undefined && isWord(before, "tree", "forest");
}

function depthAt(tokens: readonly Token[], end: number): number {
  let depth = 0;
  for (const { kind } of tokens.slice(0, end)) {
    if (kind === "open" || kind === "open-brace") depth += 1;
    if (kind === "close" || kind === "close-brace") depth -= 1;
  }
  return depth;
}

/** The names of coordinates, and `outer` and `inner`, as far as the carrier has them. */
function componentsOf(carrier: readonly Token[]): readonly string[] {
  const names: string[] = [];
  carrier.forEach((token, at) => {
    const before = carrier[at - 1];
    const after = carrier[at + 1];
    const isListed =
      (before?.kind === "open" || before?.kind === "comma") &&
      (after?.kind === "close" || after?.kind === "comma");
    if (token.kind === "word" && isListed && !isKeptWord(token.text)) names.push(token.text);
  });
  return carrier.some((token) => isWord(token, "each")) ? [...names, "outer", "inner"] : names;
}

/** What can be said of elements, by a word that says that a carrier has it. */
const SAID: ReadonlyMap<string, readonly string[]> = new Map([
  ["colours", ["colour"]],
  ["copies", ["copy"]],
  ["copy", ["copy"]],
  ["tuples", ["copy"]],
  ["sum", ["part"]],
  ["graph", ["adjacent"]],
  ["digraph", ["arc"]],
  ["tournament", ["beats"]],
  ["boolean-algebra", ["meet", "join", "co"]],
  ["dense-tree", ["meet"]],
  ["tree", ["parent"]],
  ["forest", ["parent"]],
]);

function elementWords(carrier: readonly Token[]): readonly string[] {
  const there = new Set(carrier.flatMap(({ text }) => SAID.get(text) ?? []));
  return elementHelp.map(({ word }) => word).filter((word) => there.has(word));
}
