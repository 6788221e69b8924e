/** What was run: inputs with their outputs, by session and line, kept in memory. */
import type { HistoryEntry, HistoryQuery } from "./messages.ts";

interface Line {
  readonly session: number;
  readonly line: number;
  readonly input: string;
  readonly output: string | null;
}

/** The oldest lines are forgotten beyond this many. */
const MOST_LINES = 100_000;

export class History {
  #session = 1;
  readonly #lines: Line[] = [];

  /** Lines appended from now on belong to a new session; those of earlier ones can still be asked for. */
  startSession(): void {
    this.#session += 1;
  }

  /**
   * @param line the cell's execution count
   * @param output the results as text for people; null when there are none
   */
  append(line: number, input: string, output: string | null): void {
    this.#lines.push({ session: this.#session, line, input, output });
    if (this.#lines.length > MOST_LINES) this.#lines.shift();
  }

  /** The entries that a `history_request` asks for, oldest first. */
  query(query: HistoryQuery): HistoryEntry[] {
    return this.#select(query).map(({ session, line, input, output }) => [
      session,
      line,
      query.output ? [input, output] : input,
    ]);
  }

  #select(query: HistoryQuery): Line[] {
    switch (query.hist_access_type) {
      case "tail":
        return last(this.#lines, query.n);
      case "range": {
        const session = query.session > 0 ? query.session : this.#session + query.session;
        const stop = query.stop ?? Number.POSITIVE_INFINITY;
        return this.#lines.filter(
          (entry) => entry.session === session && entry.line >= query.start && entry.line < stop,
        );
      }
      case "search": {
        const found = this.#lines.filter((entry) => matchesGlob(entry.input, query.pattern));
        return last(query.unique ? latestOfEach(found) : found, query.n);
      }
    }
  }
}

function last(lines: readonly Line[], n: number | null): Line[] {
  return n === null ? [...lines] : lines.slice(Math.max(0, lines.length - n));
}

/** Of lines with the same input, the latest only. */
function latestOfEach(lines: readonly Line[]): Line[] {
  const latest = new Map(lines.map((entry) => [entry.input, entry]));
  return lines.filter((entry) => latest.get(entry.input) === entry);
}

/**
 * Whether the whole text matches a glob in which `*` stands for any characters and `?` for one. Goes back only to the
 * last star, so the work is at most the product of the lengths.
 */
export function matchesGlob(text: string, glob: string): boolean {
  const letters = Array.from(text);
  const pattern = Array.from(glob);
  let at = 0;
  let want = 0;
  let star = -1;
  let retry = 0;
  while (at < letters.length) {
    if (pattern[want] === "*") {
      star = want++;
      retry = at;
    } else if (want < pattern.length && (pattern[want] === "?" || pattern[want] === letters[at])) {
      at++;
      want++;
    } else if (star >= 0) {
      want = star + 1;
      at = ++retry;
    } else return false;
  }
  while (pattern[want] === "*") want++;
  return want === pattern.length;
}
