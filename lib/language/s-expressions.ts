/** S-expressions of SMT-LIB 2.6 (Barrett, Fontaine and Tinelli 2021, sections 3.1 and 3.2), with their places. */

/** A stretch of the text, in UTF-16 units from its beginning. */
interface Span {
  readonly start: number;
  readonly end: number;
}

export type SExpression = Span &
  (
    | {
        readonly kind: "symbol";
        /** Without bars. */
        readonly text: string;
        /** Whether it was written between bars; then it is no reserved word. */
        readonly quoted: boolean;
      }
    /** `keyword`: with its colon; `constant`: a number, a bit vector or a string. */
    | { readonly kind: "keyword" | "constant"; readonly text: string }
    | { readonly kind: "list"; readonly items: readonly SExpression[] }
  );

/** A mistake of form. */
export interface SExpressionProblem extends Span {
  readonly code: "missing-bracket" | "unmatched-bracket" | "unknown-symbol";
  readonly message: string;
  readonly suggestion: string | null;
}

const SPACE = /(?:[\s\uFEFF]+|;[^\n\r]*)+/y;
const SYMBOL = /[A-Za-z~!@$%^&*_\-+=<>.?/][A-Za-z0-9~!@$%^&*_\-+=<>.?/]*/y;
const QUOTED = /\|[^|\\]*\|/y;
const KEYWORD = /:[A-Za-z0-9~!@$%^&*_\-+=<>.?/]+/y;
const CONSTANT =
  /(?:[0-9]+(?:\.[0-9]+)?|#x[0-9A-Fa-f]+|#b[01]+)(?![A-Za-z0-9~!@$%^&*_\-+=<>.?/])|"(?:[^"]|"")*"/y;

/** Reads all expressions of a text; of brackets that do not match, each is a problem. Linear; never throws. */
export function readSExpressions(text: string): {
  readonly expressions: readonly SExpression[];
  readonly problems: readonly SExpressionProblem[];
} {
  const expressions: SExpression[] = [];
  const problems: SExpressionProblem[] = [];
  const open: { readonly start: number; readonly items: SExpression[] }[] = [];
  let at = 0;
  const matchAt = (pattern: RegExp): string | null => {
    pattern.lastIndex = at;
    return pattern.exec(text)?.[0] ?? null;
  };
  const add = (expression: SExpression) => (open.at(-1)?.items ?? expressions).push(expression);
  while (at < text.length) {
    const space = matchAt(SPACE);
    if (space !== null) {
      at += space.length;
      continue;
    }
    const start = at;
    if (text[at] === "(") {
      open.push({ start, items: [] });
      at += 1;
      continue;
    }
    if (text[at] === ")") {
      at += 1;
      const group = open.pop();
      if (group !== undefined) add({ kind: "list", items: group.items, start: group.start, end: at });
      else
        problems.push({
          code: "unmatched-bracket",
          message: "no `(` is open that this `)` could close",
          suggestion: "leave it out",
          start,
          end: at,
        });
      continue;
    }
    const atom = readAtom(start);
    if (atom !== null) {
      at = atom.end;
      add(atom);
      continue;
    }
    const symbol = String.fromCodePoint(text.codePointAt(at)!);
    const isOpen = symbol === "|" || symbol === '"';
    at = isOpen ? text.length : at + symbol.length;
    problems.push({
      code: isOpen ? "missing-bracket" : "unknown-symbol",
      message: isOpen
        ? `this \`${symbol}\` is not closed`
        : `SMT-LIB has no \`${symbol}\` outside of \`|…|\``,
      suggestion: null,
      start,
      end: start + symbol.length,
    });
  }
  for (const { start } of open)
    problems.push({
      code: "missing-bracket",
      message: "this `(` is not closed",
      suggestion: "put in a `)`",
      start,
      end: start + 1,
    });
  return { expressions, problems };

  function readAtom(start: number): SExpression | null {
    const quoted = matchAt(QUOTED);
    if (quoted !== null)
      return { kind: "symbol", text: quoted.slice(1, -1), quoted: true, start, end: start + quoted.length };
    for (const [kind, pattern] of [
      ["constant", CONSTANT],
      ["symbol", SYMBOL],
      ["keyword", KEYWORD],
    ] as const) {
      const found = matchAt(pattern);
      if (found === null) continue;
      const span = { start, end: start + found.length };
      return kind === "symbol"
        ? { kind, text: found, quoted: false, ...span }
        : { kind, text: found, ...span };
    }
    return null;
  }
}
