/** The arguments of an application: `(x, y, …)`. */
import type { Variable } from "../logic/formula.ts";
import type { Place } from "./diagnostics.ts";
import { readRun, type Token } from "./lexer.ts";
import { isVariable } from "./names.ts";
import { quote, type Reader, Unreadable } from "./reader.ts";

/**
 * Reads `(x, y, …)`, of which the bracket comes next.
 * @param name what they are arguments of, for messages
 * @param use told of every variable that occurs
 * @returns null when an argument is no variable, which has been reported
 */
export function readArguments(
  reader: Reader,
  name: string,
  use: (variable: Variable, place: Place) => void,
): readonly Variable[] | null {
  const mark = reader.mark;
  const open = reader.next();
  const args: Variable[] = [];
  let sound = true;
  return reader.withLines(false, () => {
    if (reader.accept("close") !== null) return args;
    for (;;) {
      const token = reader.peek();
      if (token.kind === "word" && isVariable(token.text)) {
        use(token.text, token);
        args.push(token.text);
        reader.next();
      } else {
        sound = false;
        reportArgument(reader, token, name, open);
        if (reader.skipGroup(mark, "comma")) return null;
        if (!reader.at("comma")) throw new Unreadable(false);
      }
      if (reader.accept("close") !== null) return sound ? args : null;
      if (reader.accept("comma") !== null) continue;
      const found = reader.peek();
      if (found.kind === "word" && isVariable(found.text)) {
        sound = false;
        reader.report(
          "unexpected",
          found,
          `expected \`,\` or \`)\`, found ${quote(found.text)}`,
          "put a `,` between arguments",
        );
        continue;
      }
      try {
        reader.close(open, "`,` or `)`");
      } catch (error) {
        if (!(error instanceof Unreadable)) throw error;
        sound = false;
        if (reader.skipGroup(mark, "comma")) return null;
        if (reader.accept("comma") === null) throw error;
      }
    }
  });
}

function reportArgument(reader: Reader, token: Token, name: string, open: Token): void {
  try {
    if (token.kind === "end" || token.kind === "close-brace" || token.kind === "semicolon")
      reader.close(open, "a variable");
    const run = token.kind === "word" ? readRun(reader.source, token, 0).segments : [];
    const isRun = run.length > 1 && run.at(-1)!.to === token.to;
    if (isRun && !reader.names.has(token.text))
      reader.failExpected(
        `a variable as argument of ${quote(name)}`,
        `write \`${run.map(({ text }) => text).join(", ")}\``,
      );
    reader.failExpected(
      `a variable as argument of ${quote(name)}`,
      token.kind === "word" ? "variables are single lower-case letters with digits or primes" : null,
    );
  } catch (error) {
    if (!(error instanceof Unreadable)) throw error;
  }
}
