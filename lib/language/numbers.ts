/** Whole numbers in cell text: sizes, budgets, places and points. */
import { quote, type Reader } from "./reader.ts";

/** The largest whole number that is exact in a double. */
const LARGEST = 2 ** 53;

/**
 * Reads a whole number that is at least 1.
 * @param what what the number says, for messages
 * @param most the largest that is taken
 * @returns null after a mistake, with the number passed over
 */
export function readWhole(reader: Reader, what: string, most = LARGEST): number | null {
  const first = reader.peek();
  const sign = first.kind === "minus" && reader.peekAfter(1).kind === "number" ? reader.next() : null;
  const token = reader.peek();
  if (token.kind !== "number") reader.failExpected(`a whole number (${what})`);
  reader.next();
  const place = { from: first.from, to: token.to };
  const text = `${sign === null ? "" : "-"}${token.text}`;
  if (/^0*[1-9][0-9]*$/.test(text)) {
    const number = Number(text);
    if (number <= most) return number;
    const limit = most === LARGEST ? "2^53" : `${most}, the most that is taken here (${what})`;
    reader.report("size-too-large", place, `${quote(text)} is larger than ${limit}`);
    return null;
  }
  reader.report(
    "not-whole",
    place,
    `${quote(text)} is not a whole number from 1 on (${what})`,
    /^[0-9][0-9_]*$/.test(text) && /[1-9]/.test(text) ? `write ${text.replaceAll("_", "")}` : null,
  );
  return null;
}
