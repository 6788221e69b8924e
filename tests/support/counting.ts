/** Published numbers of models, from category a of tests/data/values.json. */
import type { Formula } from "../../lib/logic/formula.ts";
import { readSentences, values } from "./corpora.ts";

export interface PublishedCount {
  readonly id: string;
  readonly name: string;
  readonly source: string;
  readonly sentences: readonly Formula[];
  /** By number of points. Beyond 2^53 the file's numbers are not exact, so that only smaller ones are taken. */
  readonly labelled: ReadonlyMap<number, bigint>;
  readonly unlabelled: ReadonlyMap<number, bigint>;
}

export const publishedCounts: readonly PublishedCount[] = values
  .filter((entry) => entry.id.startsWith("a-count-"))
  .map((entry) => {
    const { class_name: name, axioms } = entry.statement as { class_name: string; axioms: string[] };
    const expected = entry.expected as Record<"labelled" | "unlabelled", Record<string, number> | undefined>;
    return {
      id: entry.id,
      name,
      source: String(entry.source),
      sentences: readSentences(axioms.filter((axiom) => axiom !== "(no axioms)")),
      labelled: numbersOf(expected.labelled ?? {}),
      unlabelled: numbersOf(expected.unlabelled ?? {}),
    };
  });

function numbersOf(bySize: Readonly<Record<string, number>>): Map<number, bigint> {
  return new Map(
    Object.entries(bySize)
      .filter(([, count]) => Number.isSafeInteger(count))
      .map(([size, count]) => [Number(size), BigInt(count)]),
  );
}
