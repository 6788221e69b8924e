/** Ways to draw one two-place relation, each for relations of some kind, and the words that explain a picture. */
import { chord, loopArc, loopArcs } from "./curves.ts";
import { type Extent, type Frame, layOutCircle, layOutGroups, layOutLayers, type Place } from "./layout.ts";
import { layOutFunctional } from "./layout-functional.ts";
import {
  classesOf,
  converseOf,
  coveringPairs,
  isAcyclic,
  isFunctional,
  isReflexive,
  isSymmetric,
  isTransitive,
  type Matrix,
  orderKind,
} from "./order.ts";
import type { Arc, DrawnPoint } from "./svg.ts";
import { displayWidth, enumerate } from "./text.ts";

/** What is written at a point: its number, and below it the one-place relations that hold of it, if any. */
export type PointLabel = readonly [string] | readonly [string, string];

export interface Plan {
  readonly points: readonly DrawnPoint[];
  readonly arcs: readonly Arc[];
  readonly frames: readonly Frame[];
}

export interface Style {
  readonly name:
    | "groups"
    | "undirected"
    | "strict-order"
    | "partial-order"
    | "classes"
    | "upward"
    | "functional"
    | "arrows";
  /** Whether the relation can be drawn so; `isMarked` says that something is written at its points. */
  readonly fits: (relation: Matrix, isMarked: boolean) => boolean;
  readonly plan: (relation: Matrix, labels: readonly PointLabel[], name: string) => Plan;
  /** What a reader of pictures of these relations must know. */
  readonly explain: (name: string, relations: readonly Matrix[]) => string;
}

/** Signs that are read "greater than": of such an order the greater point stands higher, so that lines lead down. */
export const DESCENDING: ReadonlySet<string> = new Set(">≥≻⪰≽≫⊐⊒⊃⊇⊳⊵");

/** The style that says most comes first; the last fits everything. */
export const styles: readonly Style[] = [
  {
    name: "groups",
    fits: (relation) => isReflexive(relation) && isSymmetric(relation) && isTransitive(relation),
    plan(relation, labels) {
      const extents = labels.map(extentOf);
      const { places, frames } = layOutGroups(extents, classesOf(relation).classes);
      return { points: pointsAt(places, extents, labels), arcs: [], frames };
    },
    explain: (name) => `${name} holds of (x, y) exactly when x and y stand in one frame`,
  },
  {
    name: "undirected",
    fits: isSymmetric,
    plan: (relation, labels) => planCircle([relation], labels, [true]),
    explain(name, relations) {
      const [lines, loops] = [relations.some(hasLines), relations.some(hasLoops)];
      if (!lines) return loops ? `a loop at x: ${name} holds of (x, x)` : `${name} holds of no pair`;
      return `${name} is symmetric: each line stands for both directions`;
    },
  },
  {
    name: "strict-order",
    fits: (relation) => orderKind(relation) === "strict-order",
    plan: planOrder,
    explain: (name, relations) => explainOrder(name, relations, false),
  },
  {
    name: "partial-order",
    fits: (relation) => orderKind(relation) === "partial-order",
    plan: planOrder,
    explain: (name, relations) => explainOrder(name, relations, true),
  },
  {
    name: "classes",
    fits: (relation, isMarked) => !isMarked && isReflexive(relation) && isTransitive(relation),
    plan: planClasses,
    explain(name, relations) {
      const orders = relations.map((relation) => classesOf(relation).order);
      return `${explainOrder(name, orders, true)}; points in one outline are related both ways`;
    },
  },
  {
    name: "upward",
    // Loops would meet lines that pass by, and more heads that all come from below would lie on each other.
    fits: (relation) => !hasLoops(relation) && isAcyclic(relation) && mostPredecessors(relation) <= 3,
    plan(relation, labels) {
      const extents = labels.map(extentOf);
      const { places, curves } = layOutLayers(extents, pairsOf(relation), "heads");
      const arcs = curves.map((curve): Arc => ({ curve, stroke: 0, headAtEnd: true, headAtStart: false }));
      return { points: pointsAt(places, extents, labels), arcs, frames: [] };
    },
    explain: explainArrows,
  },
  {
    name: "functional",
    fits: (relation) => isFunctional(relation) || isFunctional(converseOf(relation)),
    plan(relation, labels) {
      const map = isFunctional(relation) ? relation : converseOf(relation);
      const extents = labels.map(roundExtentOf);
      const next = map.map((row) => (row.includes(true) ? row.indexOf(true) : null));
      const places = layOutFunctional(extents, next);
      const arcs = linesBetween([relation], places, extents, [false]);
      places.forEach((place, i) => {
        if (relation[i]![i]) arcs.push(loopArc(place, extents[i]!, Math.PI / 2, 0, true));
      });
      return { points: pointsAt(places, extents, labels), arcs, frames: [] };
    },
    explain: explainArrows,
  },
  {
    name: "arrows",
    fits: () => true,
    plan: (relation, labels) => planCircle([relation], labels, [false]),
    explain: explainArrows,
  },
];

/**
 * All relations on one circle. No chord of a circle passes through a third point, and lines between the same two
 * points are bent apart, so that every one of them can be followed.
 * @param bare for each relation, whether it is symmetric and its lines are to have no heads
 */
export function planCircle(
  relations: readonly Matrix[],
  labels: readonly PointLabel[],
  bare: readonly boolean[],
): Plan {
  const extents = labels.map(roundExtentOf);
  const places = layOutCircle(extents, relations.length, Math.max(...relations.map(mostLines)));
  const arcs = linesBetween(relations, places, extents, bare);
  places.forEach((place, i) => {
    const strokes = relations.flatMap((relation, stroke) => (relation[i]![i] ? [stroke] : []));
    const outward = places.length === 1 ? -Math.PI / 2 : Math.atan2(place.y, place.x);
    arcs.push(...loopArcs(place, extents[i]!, outward, strokes, (stroke) => !bare[stroke]));
  });
  return { points: pointsAt(places, extents, labels), arcs, frames: [] };
}

/** One line for each relation and two different points; it has a head for each direction that holds. */
function linesBetween(
  relations: readonly Matrix[],
  places: readonly Place[],
  extents: readonly Extent[],
  bare: readonly boolean[],
): Arc[] {
  const arcs: Arc[] = [];
  for (let i = 0; i < places.length; i += 1)
    for (let j = i + 1; j < places.length; j += 1) {
      const present = relations.flatMap((relation, stroke) =>
        relation[i]![j] || relation[j]![i] ? [{ relation, stroke }] : [],
      );
      present.forEach(({ relation, stroke }, position) => {
        const bend = (position - (present.length - 1) / 2) * 18;
        arcs.push({
          curve: chord(places[i]!, places[j]!, bend),
          trim: [extents[i]!, extents[j]!],
          stroke,
          headAtEnd: !bare[stroke] && relation[i]![j]!,
          headAtStart: !bare[stroke] && relation[j]![i]!,
        });
      });
    }
  return arcs;
}

function planOrder(order: Matrix, labels: readonly PointLabel[], name: string): Plan {
  const extents = labels.map(extentOf);
  const upward = DESCENDING.has(name) ? converseOf(order) : order;
  const { places, curves } = layOutLayers(extents, coveringPairs(upward));
  const arcs = curves.map((curve): Arc => ({ curve, stroke: 0, headAtEnd: false, headAtStart: false }));
  return { points: pointsAt(places, extents, labels), arcs, frames: [] };
}

function planClasses(preorder: Matrix, labels: readonly PointLabel[], name: string): Plan {
  const { classes, order } = classesOf(preorder);
  return planOrder(
    order,
    classes.map((points): PointLabel => [points.map((point) => labels[point]![0]).join(", ")]),
    name,
  );
}

function explainOrder(name: string, orders: readonly Matrix[], leavesOutLoops: boolean): string {
  const isReduced = orders.some(
    (order) => coveringPairs(order).length < pairsOf(order).filter(([i, j]) => i !== j).length,
  );
  const omitted = [...(leavesOutLoops ? ["loops"] : []), ...(isReduced ? ["transitive pairs"] : [])];
  const direction = DESCENDING.has(name) ? "downward" : "upward";
  return `${name} by ${direction} lines${omitted.length === 0 ? "" : `; ${enumerate(omitted)} left out`}`;
}

export function explainArrows(name: string, relations: readonly Matrix[]): string {
  const arrow = `an arrow from x to y: ${name} holds of (x, y)`;
  return relations.some(hasPairBothWays) ? `${arrow}; heads at both ends: of (y, x) as well` : arrow;
}

function mostLines(relation: Matrix): number {
  return Math.max(
    ...relation.map((row, i) => row.filter((holds, j) => i !== j && (holds || relation[j]![i]!)).length),
  );
}

export function mostPredecessors(relation: Matrix): number {
  return Math.max(...relation.map((_, j) => relation.filter((row, i) => i !== j && row[j]).length));
}

function hasPairBothWays(relation: Matrix): boolean {
  return relation.some((row, i) => row.some((holds, j) => i < j && holds && relation[j]![i]!));
}

function hasLines(relation: Matrix): boolean {
  return relation.some((row, i) => row.some((holds, j) => i !== j && holds));
}

export function hasLoops(relation: Matrix): boolean {
  return relation.some((row, i) => row[i]!);
}

function pairsOf(matrix: Matrix): readonly (readonly [number, number])[] {
  return matrix.flatMap((row, i) =>
    row.flatMap((holds, j): (readonly [number, number])[] => (holds ? [[i, j]] : [])),
  );
}

export function pointsAt(
  places: readonly Place[],
  extents: readonly Extent[],
  labels: readonly PointLabel[],
): readonly DrawnPoint[] {
  return places.map((place, i) => ({ ...place, ...extents[i]!, lines: labels[i]! }));
}

export function extentOf(label: PointLabel): Extent {
  const width = Math.max(...label.map(displayWidth));
  if (label.length === 2) return { width: Math.max(34, 14 + 7 * width), height: 36, outline: "round" };
  return width <= 2
    ? { width: 26, height: 26, outline: "round" }
    : { width: 14 + 7.5 * width, height: 26, outline: "box" };
}

/** Lines that come from anywhere end at round outlines. */
function roundExtentOf(label: PointLabel): Extent {
  const extent = extentOf(label);
  return extent.outline === "box" ? { ...extent, width: 1.25 * extent.width, outline: "round" } : extent;
}
