/** Counts of models: a table of sizes, and one model of each class where they were asked for. */
import type { CountAnswer, CountedSize } from "../../lib/inquiry/answer.ts";
import { type Block, note } from "./blocks.ts";
import { structureRows } from "./galleries.ts";
import { endText, finishedSizes } from "./summaries.ts";
import { counted, grouped } from "./text.ts";

export function countBlocks(answer: CountAnswer, budget: number): readonly Block[] {
  const { sizes, ended, endedAt } = answer;
  const blocks: Block[] = [];
  if (sizes.length > 0) {
    blocks.push({
      kind: "table",
      caption: null,
      head: ["points", "labelled", "up to isomorphism"],
      rows: sizes.map(({ size, labelled, unlabelled }) => [
        [grouped(size)],
        [numberText(labelled)],
        [numberText(unlabelled)],
      ]),
      look: "numbers",
    });
    const drawn = sizes.some(({ representatives }) => representatives.length > 0);
    const checked =
      drawn && answer.evidence !== null ? " Each structure below was checked to be a model." : "";
    blocks.push(note(`Computed, not certified: a count carries no evidence of its own.${checked}`));
  }
  if (ended !== null) {
    const finished = finishedSizes(sizes);
    const done = finished === "" ? "No size was finished" : `Finished: ${finished}`;
    blocks.push(note(`${done}; ${endText(ended, budget, endedAt)}.`));
  }
  const rows = sizes.map((counting) => ({
    title: titleOf(counting),
    structures: counting.representatives,
  }));
  blocks.push(
    ...structureRows(
      "model",
      rows.filter(({ structures }) => structures.length > 0),
    ),
  );
  return blocks;
}

function titleOf({ size, unlabelled, representatives }: CountedSize): string {
  if (unlabelled === null)
    return `${counted(size, "point")}: ${counted(representatives.length, "model")}, no two isomorphic`;
  const classes = `${counted(size, "point")}: ${counted(unlabelled, "class", "classes")} of isomorphic models`;
  const all = BigInt(representatives.length) === unlabelled;
  if (all) return unlabelled === 1n ? `${classes}, its model` : `${classes}, one model of each`;
  return `${classes}, models of ${grouped(representatives.length)} of them`;
}

function numberText(count: bigint | null): string {
  return count === null ? "not finished" : grouped(count);
}

/** Finished numbers by size; beyond 2^53 they are strings, since JSON's readers would round them. */
export function countData({ sizes }: CountAnswer): Readonly<Record<string, unknown>> {
  const by = (pick: (counting: CountedSize) => bigint | null) =>
    Object.fromEntries(
      sizes.flatMap((counting) => {
        const count = pick(counting);
        return count === null ? [] : [[String(counting.size), plainNumber(count)]];
      }),
    );
  return { labelled: by(({ labelled }) => labelled), unlabelled: by(({ unlabelled }) => unlabelled) };
}

function plainNumber(value: bigint): number | string {
  return value <= 2n ** 53n ? Number(value) : String(value);
}
