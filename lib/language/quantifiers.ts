/** The lists of variables after quantifiers: `∀x,y,z`, `∀x y z`, `∀xyz`, and where they stop. */
import { readRun, restOfWord, type Segment, type Token } from "./lexer.ts";
import { isKeptWord, isVariable } from "./names.ts";
import { isPropertyAhead } from "./property-atoms.ts";
import { quote, type Reader } from "./reader.ts";

/** The variables after a quantifier, each once; a repeated one is reported. */
export function readVariables(reader: Reader, sign: Token): readonly Segment[] {
  const found = new Map<string, Segment>();
  let repeated: Segment | null = null;
  let due = true;
  for (;;) {
    const run = readRunAhead(reader, found.size > 0);
    if (run.length === 0) {
      if (due) reader.failExpected(`a variable after \`${found.size === 0 ? signText(sign) : ","}\``);
      break;
    }
    for (const segment of run)
      if (!found.has(segment.text)) found.set(segment.text, segment);
      else repeated ??= segment;
    due = reader.at("comma");
    if (due) {
      reader.next();
      reader.crossLine();
    }
  }
  if (repeated !== null)
    reader.report(
      "variable-twice",
      repeated,
      `${quote(repeated.text)} occurs twice in the list after \`${signText(sign)}\``,
      "leave one out, or give it another name",
    );
  return [...found.values()];
}

/** Reads variables of the list from the next word; none when the word, or its next letter, ends the list. */
function readRunAhead(reader: Reader, inList: boolean): readonly Segment[] {
  const word = reader.peek();
  if (word.kind !== "word") return [];
  if (word.group && !isVariable(word.text)) return [];
  if (reader.names.has(word.text) || isKeptWord(word.text) || isPropertyAhead(reader, word)) return [];
  const { segments, offsets } = word.group
    ? { segments: [word], offsets: [0, word.end - word.start] }
    : readRun(reader.source, word, 0);
  const wordLength = word.end - word.start;
  if (inList && offsets.at(-1) === wordLength && isCallAhead(reader)) return [];
  let taken = 0;
  while (taken < segments.length && (taken === 0 || !isNameAhead(reader, word, offsets[taken]!))) taken += 1;
  // The last letter of the word may begin `x = …` or an infix atom.
  if (taken === segments.length && offsets[taken] === wordLength && isInfixAfterNext(reader)) taken -= 1;
  const end = offsets[taken]!;
  if (taken > 0) {
    if (end === wordLength) reader.next();
    else reader.replaceNext(restOfWord(reader.source, word, end));
  }
  return segments.slice(0, taken);
}

/** Whether the rest of a word is a name, or a sign such as `true`. */
function isNameAhead(reader: Reader, word: Token, offset: number): boolean {
  const { names, source } = reader;
  const length = word.end - word.start - offset;
  if (length > Math.max(names.longest, 6)) return false;
  const rest = restOfWord(source, word, offset);
  return length > 1 && (rest.kind !== "word" || names.has(rest.text));
}

/** Whether `word(x, …` or `word(x)` comes next, which applies a name to arguments. */
function isCallAhead(reader: Reader): boolean {
  const [open, first, after] = [1, 2, 3].map((count) => reader.peekAfter(count));
  return (
    open!.kind === "open" &&
    first!.kind === "word" &&
    isVariable(first!.text) &&
    (after!.kind === "comma" || after!.kind === "close")
  );
}

/** Whether the token after the next one makes an atom of a variable before it. */
function isInfixAfterNext(reader: Reader): boolean {
  const sign = reader.peekAfter(1);
  if (sign.kind === "equal" || sign.kind === "not-equal") return true;
  const isRelation =
    sign.kind === "relation-sign" ||
    (sign.kind === "word" && !isVariable(sign.text) && reader.names.isInfix(sign.text));
  return isRelation && reader.peekAfter(2).kind !== "open";
}

function signText(sign: Token): string {
  return sign.kind === "forall" ? "∀" : "∃";
}
