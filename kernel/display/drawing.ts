/**
 * Small structures as pictures. A picture is one SVG document on a card of its own, so that it reads on light and
 * dark pages; relations are told apart by the strokes of their lines, never by colour.
 */
import { type Structure, tuplesOf } from "../../lib/carriers/structure.ts";
import type { PictureBlock } from "./blocks.ts";
import { prepareLayout } from "./layout.ts";
import { isSymmetric, type Matrix, matrixOf } from "./order.ts";
import { type Plan, type PointLabel, planCircle, styles } from "./styles.ts";
import { type LegendEntry, renderPicture, STROKES } from "./svg.ts";
import { counted, enumerate, shorten } from "./text.ts";

/** Structures with more points are shown as tables only. */
export const DRAWN_POINTS = 20;

/** Up to this many points every relation is drawn; beyond, only those with few enough lines to be followed. */
const ALWAYS_DRAWN_POINTS = 12;
const FOLLOWED_LINES = 80;

/** Tuples that the alternative text lists for a relation. */
const TOLD_TUPLES = 60;

/** Must be awaited once before anything is drawn; drawing itself does not wait. */
export async function prepareDrawing(): Promise<void> {
  await prepareLayout();
}

/** A structure as far as it can be drawn. */
interface Drawable {
  readonly structure: Structure;
  /** The two-place relations, in order. */
  readonly names: readonly string[];
  readonly matrices: readonly Matrix[];
  readonly labels: readonly PointLabel[];
  readonly isMarked: boolean;
}

/**
 * Draws the two-place relations of a structure on points, with its one-place relations written at the points.
 * Relations of more places are not drawn, and the caption says so.
 * @returns null when there are too many points, lines or relations, or nothing to draw
 */
export function drawStructure(structure: Structure): PictureBlock | null {
  const drawable = drawableOf(structure);
  if (drawable === null) return null;
  const { plan, explain } = wayToDraw([drawable]);
  return pictureOf(drawable, plan(drawable), legendOf(drawable), explain);
}

/** Pictures of structures that are drawn in one way. */
export interface Gallery {
  /** In order, without captions. */
  readonly pictures: readonly PictureBlock[];
  /** What a reader of the pictures must know. */
  readonly caption: string;
}

/**
 * Draws structures of one signature in one way, so that they can be compared: as orders if all are orders, and so on.
 * @returns null when there are none, or one of them cannot be drawn
 */
export function drawGallery(structures: readonly Structure[]): Gallery | null {
  const drawables = structures.flatMap((structure) => drawableOf(structure) ?? []);
  const [first] = drawables;
  if (first === undefined || drawables.length < structures.length) return null;
  if (drawables.some(({ names }) => names.join() !== first.names.join())) return null;
  const { plan, explain } = wayToDraw(drawables);
  const strokes =
    first.names.length === 1
      ? []
      : [first.names.map((name, stroke) => `${name}: ${STROKES[stroke]!.name}`).join(", ")];
  return {
    pictures: drawables.map((drawable) => ({
      ...pictureOf(drawable, plan(drawable), [], explain),
      caption: "",
    })),
    caption: [...strokes, explain].join("; "),
  };
}

function drawableOf(structure: Structure): Drawable | null {
  const size = structure.carrier.size;
  if (size === null || size > DRAWN_POINTS) return null;
  const names = [...structure.tables.values()]
    .filter(({ relation }) => relation.places === 2)
    .map(({ relation }) => relation.name);
  if (names.length === 0 || names.length > STROKES.length) return null;
  const matrices = names.map((name) => matrixOf(size, tuplesOf(structure, name)));
  const marks = marksOf(structure, size);
  const labels = marks.map(
    (marked, index): PointLabel =>
      marked.length === 0 ? [String(index + 1)] : [String(index + 1), shorten(marked.join(", "), 14)],
  );
  const drawable = { structure, names, matrices, labels, isMarked: marks.some(({ length }) => length > 0) };
  if (size <= ALWAYS_DRAWN_POINTS) return drawable;
  const { arcs } = wayToDraw([drawable]).plan(drawable);
  return arcs.length <= FOLLOWED_LINES ? drawable : null;
}

/** The first way that suits all of them, and how it is explained. */
function wayToDraw(drawables: readonly Drawable[]): {
  readonly plan: (drawable: Drawable) => Plan;
  readonly explain: string;
} {
  const { names, structure } = drawables[0]!;
  const omitted = [...structure.tables.values()].flatMap(({ relation }) =>
    relation.places > 2 ? [relation.name] : [],
  );
  const missing = omitted.length === 0 ? [] : [`${enumerate(omitted)} not drawn`];
  if (names.length === 1) {
    const style = styles.find(({ fits }) =>
      drawables.every(({ matrices, isMarked }) => fits(matrices[0]!, isMarked)),
    )!;
    const remark = style.explain(
      names[0]!,
      drawables.map(({ matrices }) => matrices[0]!),
    );
    return {
      plan: ({ matrices, labels }) => style.plan(matrices[0]!, labels, names[0]!),
      explain: [remark, ...missing].join("; "),
    };
  }
  const symmetric = names.map((_, index) => drawables.every(({ matrices }) => isSymmetric(matrices[index]!)));
  const remarks = ["an arrow from x to y: the relation holds of (x, y)"];
  if (symmetric.includes(true)) remarks.push("a line without heads: of both directions");
  return {
    plan: ({ matrices, labels }) => planCircle(matrices, labels, symmetric),
    explain: [...remarks, ...missing].join("; "),
  };
}

function legendOf({ names, matrices }: Drawable): readonly LegendEntry[] {
  if (names.length === 1) return [];
  return names.map((name, stroke) => ({
    name: shorten(name, 24),
    stroke,
    heads: !isSymmetric(matrices[stroke]!),
  }));
}

function pictureOf(
  { structure }: Drawable,
  plan: Plan,
  legend: readonly LegendEntry[],
  explain: string,
): PictureBlock {
  return {
    kind: "picture",
    svg: renderPicture({ ...plan, legend }),
    alt: describePicture(structure, explain),
    caption: explain,
  };
}

/** For each point, the one-place relations that hold of it. */
function marksOf(structure: Structure, size: number): readonly (readonly string[])[] {
  const marks = Array.from({ length: size }, (): string[] => []);
  for (const { relation } of structure.tables.values())
    if (relation.places === 1)
      for (const [point] of tuplesOf(structure, relation.name)) marks[point! - 1]!.push(relation.name);
  return marks;
}

function describePicture(structure: Structure, remark: string): string {
  const size = structure.carrier.size!;
  const sentences = [...structure.tables.values()].map(({ relation }) => {
    const tuples = tuplesOf(structure, relation.name);
    if (tuples.length === 0) return `${relation.name} holds of nothing.`;
    if (tuples.length > TOLD_TUPLES) return `${relation.name} holds of ${tuples.length} tuples.`;
    const list = tuples.map((tuple) => (tuple.length === 1 ? String(tuple[0]) : `(${tuple.join(",")})`));
    return `${relation.name} holds of ${list.join(", ")}.`;
  });
  return [`Drawing of ${counted(size, "point")}.`, ...sentences, `Drawn: ${remark}.`].join(" ");
}
