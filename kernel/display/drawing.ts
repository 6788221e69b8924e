/**
 * Small structures as pictures. A picture is one SVG document on a card of its own, so that it reads on light and
 * dark pages; relations are told apart by the strokes of their lines, never by colour.
 */
import { type Structure, tuplesOf } from "../../lib/carriers/structure.ts";
import type { PictureBlock } from "./blocks.ts";
import { type Extent, layOutCircle, layOutLayers, type Place, prepareLayout, type Spline } from "./layout.ts";
import { coveringPairs, isAcyclic, isSymmetric, type Matrix, matrixOf, orderKind } from "./order.ts";
import { type Arc, type LegendEntry, renderPicture, STROKES } from "./svg.ts";
import { counted, displayWidth, enumerate, shorten } from "./text.ts";

/** Structures with more points are shown as tables only. */
export const DRAWN_POINTS = 12;

/** Tuples that the alternative text lists for a relation. */
const TOLD_TUPLES = 60;

/** Must be awaited once before anything is drawn; drawing itself does not wait. */
export async function prepareDrawing(): Promise<void> {
  await prepareLayout();
}

/** A two-place relation to be drawn. */
interface DrawnRelation {
  readonly name: string;
  readonly matrix: Matrix;
  readonly symmetric: boolean;
}

/**
 * Draws the two-place relations of a structure on points, with its one-place relations written at the points.
 * Relations of more places are not drawn, and the caption says so.
 * @returns null when there are too many points or relations, or nothing to draw
 */
export function drawStructure(structure: Structure): PictureBlock | null {
  const size = structure.carrier.size;
  if (size === null || size > DRAWN_POINTS) return null;
  const tables = [...structure.tables.values()];
  const relations = tables
    .filter(({ relation }) => relation.places === 2)
    .map(({ relation: { name } }): DrawnRelation => {
      const matrix = matrixOf(size, tuplesOf(structure, name));
      return { name, matrix, symmetric: isSymmetric(matrix) };
    });
  if (relations.length === 0 || relations.length > STROKES.length) return null;
  const marks = marksOf(structure, size);
  const lines = marks.map((names, index) =>
    names.length === 0 ? [String(index + 1)] : [String(index + 1), shorten(names.join(", "), 14)],
  );
  const extents = lines.map(extentOf);
  const { places, arcs, remarks } =
    relations.length === 1 ? drawOne(relations[0]!, extents) : drawSeveral(relations, extents);
  const omitted = tables.filter(({ relation }) => relation.places > 2).map(({ relation }) => relation.name);
  if (omitted.length > 0) remarks.push(`${enumerate(omitted)} not drawn`);
  const legend: LegendEntry[] =
    relations.length === 1
      ? []
      : relations.map(({ name, symmetric }, stroke) => ({
          name: shorten(name, 24),
          stroke,
          heads: !symmetric,
        }));
  return {
    kind: "picture",
    svg: renderPicture({
      points: places.map((place, i) => ({ ...place, ...extents[i]!, lines: lines[i]! })),
      arcs,
      legend,
    }),
    alt: describePicture(structure, remarks),
    caption: remarks.join("; "),
  };
}

interface Plan {
  readonly places: readonly Place[];
  readonly arcs: readonly Arc[];
  /** What the reader must know to read the picture. */
  readonly remarks: string[];
}

function drawOne(relation: DrawnRelation, extents: readonly Extent[]): Plan {
  const { name, matrix, symmetric } = relation;
  const kind = orderKind(matrix);
  const empty = matrix.every((row) => !row.includes(true));
  if (empty) return { places: layOutCircle(extents, 1), arcs: [], remarks: [`${name} holds of no pair`] };
  if (symmetric) {
    const hasLoopsOnly = matrix.every((row, i) => row.every((holds, j) => i === j || !holds));
    const remark = hasLoopsOnly
      ? `a loop at x: ${name} holds of (x, x)`
      : `${name} is symmetric: each line stands for both directions`;
    const plan = drawSeveral([relation], extents);
    return { ...plan, remarks: [remark] };
  }
  if (kind !== null) {
    const pairs = coveringPairs(matrix);
    const { places, curves } = layOutLayers(extents, pairs);
    const arcs = curves.map((curve): Arc => ({ curve, stroke: 0, headAtEnd: false, headAtStart: false }));
    const isReduced = pairs.length < pairsOf(matrix).filter(([i, j]) => i !== j).length;
    const omitted = [
      ...(kind === "partial-order" ? ["loops"] : []),
      ...(isReduced ? ["transitive pairs"] : []),
    ];
    const remark = omitted.length === 0 ? "" : `; ${enumerate(omitted)} left out`;
    return { places, arcs, remarks: [`${name} by upward lines${remark}`] };
  }
  if (isAcyclic(matrix)) {
    const pairs = pairsOf(matrix).filter(([i, j]) => i !== j);
    const { places, curves } = layOutLayers(extents, pairs);
    const arcs: Arc[] = curves.map((curve) => ({ curve, stroke: 0, headAtEnd: true, headAtStart: false }));
    matrix.forEach((row, i) => {
      if (row[i]) arcs.push(loopArc(places[i]!, extents[i]!, 0, 0, true, 0));
    });
    return { places, arcs, remarks: [`an arrow from x to y: ${name} holds of (x, y)`] };
  }
  const plan = drawSeveral([relation], extents);
  return { ...plan, remarks: [`an arrow from x to y: ${name} holds of (x, y)`] };
}

/**
 * All relations on one circle. No chord of a circle passes through a third point, and lines between the same two
 * points are bent apart, so that every one of them can be followed.
 */
function drawSeveral(relations: readonly DrawnRelation[], extents: readonly Extent[]): Plan {
  const places = layOutCircle(extents, relations.length);
  const arcs: Arc[] = [];
  const remarks = relations.length === 1 ? [] : ["an arrow from x to y: the relation holds of (x, y)"];
  if (relations.length > 1 && relations.some(({ symmetric }) => symmetric))
    remarks.push("a line without heads: of both directions");
  for (let i = 0; i < extents.length; i += 1) {
    for (let j = i + 1; j < extents.length; j += 1) {
      const present = relations.flatMap((relation, stroke) =>
        relation.matrix[i]![j] || relation.matrix[j]![i] ? [{ relation, stroke }] : [],
      );
      present.forEach(({ relation, stroke }, position) => {
        const bend = (position - (present.length - 1) / 2) * 18;
        arcs.push({
          curve: chord(places[i]!, places[j]!, bend),
          trim: [extents[i]!, extents[j]!],
          stroke,
          headAtEnd: !relation.symmetric && relation.matrix[i]![j]!,
          headAtStart: !relation.symmetric && relation.matrix[j]![i]!,
        });
      });
    }
    let nested = 0;
    relations.forEach(({ matrix, symmetric }, stroke) => {
      if (!matrix[i]![i]) return;
      const place = places[i]!;
      const outward = extents.length === 1 ? -Math.PI / 2 : Math.atan2(place.y, place.x);
      arcs.push(loopArc(place, extents[i]!, outward, stroke, !symmetric, nested));
      nested += 1;
    });
  }
  return { places, arcs, remarks };
}

function pairsOf(matrix: Matrix): readonly (readonly [number, number])[] {
  return matrix.flatMap((row, i) =>
    row.flatMap((holds, j): (readonly [number, number])[] => (holds ? [[i, j]] : [])),
  );
}

/** A curve from one place to another, its middle moved to the side by `bend`. */
function chord(from: Place, to: Place, bend: number): Spline {
  const length = Math.hypot(to.x - from.x, to.y - from.y);
  const side = { x: (-(to.y - from.y) / length) * bend, y: ((to.x - from.x) / length) * bend };
  // A cubic's middle lies three quarters of the way to its two inner control points.
  const at = (share: number): Place => ({
    x: from.x + (to.x - from.x) * share + (side.x * 4) / 3,
    y: from.y + (to.y - from.y) * share + (side.y * 4) / 3,
  });
  return [from, at(1 / 3), at(2 / 3), to];
}

/** A loop on the side of a point that faces `angle`; further loops at the same point lie around it. */
function loopArc(
  place: Place,
  extent: Extent,
  angle: number,
  stroke: number,
  head: boolean,
  nested: number,
): Arc {
  const reach = 26 + 19 * nested;
  const spread = 0.55 + 0.3 * nested;
  const at = (turn: number, x: number, y: number): Place => ({
    x: place.x + Math.cos(angle + turn) * x,
    y: place.y + Math.sin(angle + turn) * y,
  });
  const [rx, ry] = [extent.width / 2, extent.height / 2];
  return {
    curve: [
      at(-spread, rx, ry),
      at(-spread, rx + reach, ry + reach),
      at(spread, rx + reach, ry + reach),
      at(spread, rx, ry),
    ],
    stroke,
    headAtEnd: head,
    headAtStart: false,
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

function extentOf(lines: readonly string[]): Extent {
  if (lines.length === 1) return { width: 26, height: 26 };
  return { width: Math.max(34, 14 + 7 * Math.max(...lines.map(displayWidth))), height: 36 };
}

function describePicture(structure: Structure, remarks: readonly string[]): string {
  const size = structure.carrier.size!;
  const sentences = [...structure.tables.values()].map(({ relation }) => {
    const tuples = tuplesOf(structure, relation.name);
    if (tuples.length === 0) return `${relation.name} holds of nothing.`;
    if (tuples.length > TOLD_TUPLES) return `${relation.name} holds of ${tuples.length} tuples.`;
    const list = tuples.map((tuple) => (tuple.length === 1 ? String(tuple[0]) : `(${tuple.join(",")})`));
    return `${relation.name} holds of ${list.join(", ")}.`;
  });
  return [
    `Drawing of ${counted(size, "point")}.`,
    ...sentences,
    ...(remarks.length === 0 ? [] : [`Drawn: ${remarks.join("; ")}.`]),
  ].join(" ");
}
