/** The trailing phrases of a question: `up to 8`, `within 50000 steps`. */
import { optionHelp } from "./help.ts";
import type { Token } from "./lexer.ts";
import { readWhole } from "./numbers.ts";
import { quote, type Reader } from "./reader.ts";
import type { Options } from "./statements.ts";

const FORMS = optionHelp.map(({ form }) => `\`${form}\``).join(" and ");

/**
 * Reads the options that follow, in any order.
 * @param extra reads an option of the statement's own, which begins with the word given, when it is given
 */
export function readOptions(
  reader: Reader,
  extra?: { readonly word: string; readonly read: () => void },
): Options {
  let upTo: number | null = null;
  let within: number | null = null;
  const seen = new Set<string>();
  for (;;) {
    const word = reader.peek();
    if (reader.acceptWord("up") !== null) {
      reader.expectWord("to", "write `up to 8`");
      reportRepeated(reader, word, seen);
      upTo = readWhole(reader, "up to how many points");
    } else if (reader.acceptWord("within") !== null) {
      reportRepeated(reader, word, seen);
      within = readWhole(reader, "within how many steps");
      const isGrouped = reader.at("comma") && reader.peekAfter(1).kind === "number";
      if (reader.acceptWord("step") === null)
        reader.expectWord(
          "steps",
          isGrouped ? "write the number without commas" : "write `within 50000 steps`",
        );
    } else if (extra !== undefined && reader.acceptWord(extra.word) !== null) {
      reportRepeated(reader, word, seen);
      extra.read();
    } else if (reader.atWord("to") && reader.peekAfter(1).text === "depth")
      reader.fail(
        "not-in-this-version",
        word,
        "`to depth d` is not an option of this version",
        `options are ${FORMS}`,
      );
    else return { upTo, within };
  }
}

function reportRepeated(reader: Reader, word: Token, seen: Set<string>): void {
  if (seen.has(word.text))
    reader.report("option-twice", word, `the option ${quote(word.text)} is given twice`, "leave one out");
  seen.add(word.text);
}
