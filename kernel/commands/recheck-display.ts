/** Whether an output shows the result that is stored with it: a reader sees the output, and not its metadata. */
import { joinLines, type MultilineString } from "../notebook/nbformat.ts";

interface Told {
  readonly verdict: string | null;
  readonly summary: string;
}

/** Why the output does not begin with the result's summary, or null. */
export function findOtherText(
  { verdict, summary }: Told,
  data: Readonly<Record<string, unknown>>,
): string | null {
  if (verdict !== null && !summary.startsWith(`${verdict}:`))
    return `the stored summary does not begin with the verdict \`${verdict}\``;
  for (const [type, readable] of READABLE) {
    const form = data[type];
    if (form === undefined) continue;
    if (!bare(readable(joinLines(form as MultilineString))).startsWith(bare(summary)))
      return `the output shows something else than the stored result (${type})`;
  }
  return data["text/plain"] === undefined ? "the output has no text" : null;
}

/** For each form that people read, its text without markup. */
const READABLE: ReadonlyMap<string, (form: string) => string> = new Map([
  ["text/plain", (form: string) => form],
  [
    "text/html",
    (form: string) =>
      form
        .replace(/<[^>]*>/g, "")
        .replace(/&lt;/g, "<")
        .replace(/&gt;/g, ">")
        .replace(/&quot;/g, '"')
        .replace(/&#39;/g, "'")
        .replace(/&amp;/g, "&"),
  ],
]);

/** A verdict that leads is set off by a colon in one form and by colour in another, and lines are broken anywhere. */
function bare(text: string): string {
  return text.replace(/[\s:]/g, "");
}
