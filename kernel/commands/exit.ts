/** How commands end. */
import { readFile } from "node:fs/promises";

export const EXIT_FINE = 0;
/** A claim, cell or evidence failed. */
export const EXIT_FAILED = 1;
/** Wrong usage or unreadable input. */
export const EXIT_USAGE = 2;

/** Input that cannot be read; the message says which and why. */
export class UnreadableInput extends Error {}

/** The text of a file, or of standard input for `-`. @throws UnreadableInput */
export async function readInput(file: string): Promise<string> {
  try {
    if (file === "-") {
      const parts: Buffer[] = [];
      for await (const part of process.stdin) parts.push(part as Buffer);
      return decode(Buffer.concat(parts), "standard input");
    }
    return decode(await readFile(file), file);
  } catch (problem) {
    if (problem instanceof UnreadableInput) throw problem;
    const { code, message } = problem as NodeJS.ErrnoException;
    const reasons: Record<string, string> = { ENOENT: "there is no such file", EISDIR: "it is a folder" };
    throw new UnreadableInput(`cannot read ${file}: ${reasons[code ?? ""] ?? message}`);
  }
}

function decode(bytes: Buffer, name: string): string {
  try {
    return new TextDecoder("utf-8", { fatal: true }).decode(bytes);
  } catch {
    throw new UnreadableInput(`cannot read ${name}: it is not UTF-8 text`);
  }
}
