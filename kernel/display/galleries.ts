/** Several structures of one kind: their pictures in rows, each with its number, and all of them as text. */
import type { Structure } from "../../lib/carriers/structure.ts";
import { type Block, code, type Inline, line } from "./blocks.ts";
import { drawGallery } from "./drawing.ts";
import { domainOf, sourceOf, structureBlocks } from "./structures.ts";
import { counted } from "./text.ts";

/** So few structures are shown one by one, each with its tables. */
const SHOWN_SINGLY = 2;

/** Pictures that stand open; the rest are folded. Of large structures fewer go on a screen. */
const OPEN_PICTURES = 24;
const OPEN_LARGE_PICTURES = 6;
const LARGE_POINTS = 9;

/** Structures that belong together under a title. */
export interface Row {
  readonly title: string;
  readonly structures: readonly Structure[];
}

/**
 * Structures of one signature, numbered from 1.
 * @param noun what each of them is: `model`
 */
export function numberedStructures(noun: string, structures: readonly Structure[]): readonly Block[] {
  if (structures.length <= SHOWN_SINGLY)
    return structures.flatMap((structure, index) => structureBlocks(`${noun} ${index + 1}`, structure));
  return structureRows(noun, [{ title: "", structures }]);
}

/** Rows of structures of one signature, all drawn in one way; each row is numbered from 1. */
export function structureRows(noun: string, rows: readonly Row[]): readonly Block[] {
  const structures = rows.flatMap((row) => row.structures);
  const gallery = drawGallery(structures);
  const list = listOf(noun, rows);
  if (gallery === null) return structures.length === 0 ? [] : [list];
  const isLarge = structures.some(({ carrier }) => (carrier.size ?? 0) >= LARGE_POINTS);
  const open = isLarge ? OPEN_LARGE_PICTURES : OPEN_PICTURES;
  const blocks: Block[] = [];
  let used = 0;
  rows.forEach((row, index) => {
    const pictures = row.structures.map((_, number) => ({
      ...gallery.pictures[used + number]!,
      label: String(number + 1),
    }));
    const room = Math.max(0, index === 0 ? open : open - used);
    used += pictures.length;
    const [shown, rest] = [pictures.slice(0, room), pictures.slice(room)];
    if (row.title !== "" && shown.length > 0) blocks.push(line(row.title));
    if (shown.length > 0) blocks.push({ kind: "gallery", pictures: shown, caption: "" });
    if (rest.length === 0) return;
    const more = counted(rest.length, shown.length === 0 ? "picture" : "more picture");
    const title = shown.length > 0 || row.title === "" ? more : `${row.title} (${more})`;
    blocks.push({ kind: "fold", title, blocks: [{ kind: "gallery", pictures: rest, caption: "" }] });
  });
  blocks.push({ kind: "gallery", pictures: [], caption: gallery.caption });
  return [...blocks, { kind: "fold", title: `The ${noun}s as cell text`, blocks: [list] }];
}

function listOf(noun: string, rows: readonly Row[]): Block {
  return {
    kind: "table",
    caption: null,
    head: [noun, "as cell text"],
    rows: rows.flatMap(({ structures }) =>
      structures.map((structure, index) => [[String(index + 1)], listed(structure)]),
    ),
    look: "prose",
  };
}

function listed(structure: Structure): readonly Inline[] {
  const source = sourceOf(structure);
  return [source === null ? `${domainOf(structure)}; too many tuples to list` : code(source)];
}
