/** Several structures of one kind: their pictures in rows, each with its number, and all of them as text. */
import type { Structure } from "../../lib/carriers/structure.ts";
import { type Block, code, type Inline, note } from "./blocks.ts";
import { drawGallery } from "./drawing.ts";
import { sizeOf, sourceOf, structureBlocks } from "./structures.ts";
import { counted } from "./text.ts";

/** So few structures are shown one by one, each with its tables. */
const SHOWN_SINGLY = 2;

/** Pictures that stand open; the rest are folded. Of large structures fewer go on a screen. */
const OPEN_PICTURES = 24;
const OPEN_LARGE_PICTURES = 6;
const LARGE_POINTS = 9;

/**
 * Structures of one signature, numbered from 1.
 * @param noun what each of them is: `model`
 */
export function numberedStructures(noun: string, structures: readonly Structure[]): readonly Block[] {
  if (structures.length <= SHOWN_SINGLY)
    return structures.flatMap((structure, index) => structureBlocks(`${noun} ${index + 1}`, structure));
  const gallery = drawGallery(structures);
  const list = listOf(noun, structures);
  if (gallery === null) return [list];
  const isLarge = structures.some(({ carrier }) => (carrier.size ?? 0) >= LARGE_POINTS);
  const open = isLarge ? OPEN_LARGE_PICTURES : OPEN_PICTURES;
  const pictures = gallery.pictures.map((picture, index) => ({ ...picture, label: String(index + 1) }));
  const rest = pictures.slice(open);
  return [
    { kind: "gallery", pictures: pictures.slice(0, open) },
    ...(rest.length === 0
      ? []
      : [
          {
            kind: "fold",
            title: counted(rest.length, "more picture"),
            blocks: [{ kind: "gallery", pictures: rest }],
          } as const,
        ]),
    ...(gallery.caption === "" ? [] : [note(`Drawn: ${gallery.caption}.`)]),
    { kind: "fold", title: "The same as cell text", blocks: [list] },
  ];
}

function listOf(noun: string, structures: readonly Structure[]): Block {
  return {
    kind: "table",
    caption: null,
    head: [noun, "as cell text"],
    rows: structures.map((structure, index) => [[String(index + 1)], listed(structure)]),
    look: "prose",
  };
}

function listed(structure: Structure): readonly Inline[] {
  const source = sourceOf(structure);
  return [source === null ? `${sizeOf(structure)}; too many tuples to list` : code(source)];
}
