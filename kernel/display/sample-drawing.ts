/**
 * Pictures of infinite structures: the relation between the elements of a sample, with signs for all that is not drawn.
 * What the signs say is true of the whole structure: that others lie between two elements, or beyond one, is asked of
 * the carrier.
 */
import type { Structure, Table } from "../../lib/carriers/structure.ts";
import type { PictureBlock } from "./blocks.ts";
import { type Extent, layOutGroups, layOutLayers } from "./layout.ts";
import {
  classesOf,
  converseOf,
  coveringPairs,
  isAcyclic,
  isFunctional,
  isSymmetric,
  type Matrix,
} from "./order.ts";
import { type Other, relationOn, type SampleRelation, wholeRelation } from "./sample-relations.ts";
import { type Sample, sampleOf } from "./samples.ts";
import {
  DESCENDING,
  explainArrows,
  extentOf,
  hasLoops,
  mostPredecessors,
  type Plan,
  type PointLabel,
  planCircle,
  pointsAt,
  styles,
} from "./styles.ts";
import { type Arc, type LegendEntry, renderPicture, STROKES } from "./svg.ts";
import { enumerate, shorten } from "./text.ts";

/** Elements that a sample of a line has. */
const SAMPLED = 4;

/** Strokes by what they say in pictures of one relation. */
const PLAIN = 0;
const WITH_OTHERS = 1;
const TO_OTHERS = 2;

/** Where a line to others ends: nothing is drawn there. */
const NOWHERE: Extent = { width: 3, height: 3, outline: "none" };

/** A plan, and what a reader must know of it. */
interface Explained {
  readonly plan: Plan;
  readonly remarks: readonly string[];
}

/**
 * Draws a sample of a structure on an infinite carrier. {@link prepareDrawing} must have been awaited.
 * @returns null when there is no two-place relation, there are too many, or no small sample gives an idea
 */
export function drawSample(structure: Structure): PictureBlock | null {
  const tables = [...structure.tables.values()].filter(({ relation }) => relation.places === 2);
  if (tables.length === 0 || tables.length > STROKES.length) return null;
  const sample = sampleOf(structure.carrier, SAMPLED);
  if (sample === null) return null;
  const relations = tables.map((table) => relationOn(structure, table, sample));
  if (relations.includes(null)) return null;
  const found = relations as readonly SampleRelation[];
  const labels = labelsOf(structure, sample);
  const { plan, remarks } =
    found.length === 1
      ? planOne(structure, tables[0]!, found[0]!, labels, sample.isRow)
      : planSeveral(found, labels);
  const omitted = [...structure.tables.values()].flatMap(({ relation }) =>
    relation.places > 2 ? [relation.name] : [],
  );
  const caption = [
    `a sample: ${sample.elements.length} of infinitely many elements`,
    ...sample.legend,
    ...remarks,
    ...(omitted.length === 0 ? [] : [`${enumerate(omitted)} not drawn`]),
  ].join("; ");
  return {
    kind: "picture",
    svg: renderPicture({ ...plan, legend: legendOf(found) }),
    alt: altText(found, sample, caption),
    caption,
  };
}

/** The name of each element; below it what the sample and the one-place relations say of it. */
function labelsOf(
  { carrier, tables }: Structure,
  { configuration, elements }: Sample,
): readonly PointLabel[] {
  return elements.map(({ name, mark }, place): PointLabel => {
    const marks = mark === null ? [] : [mark];
    for (const { relation, holds } of tables.values())
      if (relation.places === 1 && holds[carrier.kindOf(configuration, [place])] === 1)
        marks.push(relation.name);
    return marks.length === 0 ? [name] : [name, shorten(marks.join(", "), 14)];
  });
}

/** The way of drawing that says most comes first; the last fits everything. */
function planOne(
  structure: Structure,
  table: Table,
  relation: SampleRelation,
  labels: readonly PointLabel[],
  isRow: boolean,
): Explained {
  if (!table.holds.includes(1)) {
    const { plan } = planRound(relation, labels);
    return { plan, remarks: [`${relation.name} holds of no pair`] };
  }
  const whole = wholeRelation(structure, table);
  if (whole.isEquivalence) return planGroups(relation, labels);
  const isMarked = labels.some(({ length }) => length > 1);
  const { classes } = classesOf(relation.matrix);
  const isMerged = whole.isPreorder && classes.length < labels.length;
  if (whole.isStrictOrder || (whole.isPreorder && !(isMerged && isMarked)))
    return planOrder(relation, labels, whole.isPreorder);
  if (whole.isSymmetric) return planUndirected(relation, labels, isRow);
  return (
    planLayers(relation, labels, isRow) ?? planFunctional(relation, labels) ?? planRound(relation, labels)
  );
}

/** Frames around classes; dots for members that are not drawn, and for classes. */
function planGroups({ matrix, others, name }: SampleRelation, labels: readonly PointLabel[]): Explained {
  const dots: Extent = { width: 22, height: 26, outline: "none" };
  const extents: Extent[] = labels.map(extentOf);
  const texts: PointLabel[] = [...labels];
  const addDots = () => {
    extents.push(dots);
    texts.push(["…"]);
    return extents.length - 1;
  };
  const classes = classesOf(matrix).classes.map((members) =>
    others.some(({ to }) => to[members[0]!]) ? [...members, addDots()] : [...members],
  );
  const hasMore = others.some(({ to }) => !to.includes(true));
  if (hasMore) classes.push([addDots()]);
  const { places, frames } = layOutGroups(extents, classes);
  const hasDots = texts.length > labels.length;
  return {
    plan: { points: pointsAt(places, extents, texts), arcs: [], frames },
    remarks: [
      `${name} holds of (x, y) exactly when x and y stand in one frame`,
      ...(hasDots ? [`dots: others${hasMore ? ", also in further frames" : ""}`] : []),
    ],
  };
}

/**
 * Layers by covering pairs. A line is plain where nothing lies between in the whole structure; dotted lines lead to
 * elements that are above or below one and not between it and a drawn one.
 * @param isReflexive then equivalent elements are merged
 */
function planOrder(
  { matrix, others, name }: SampleRelation,
  labels: readonly PointLabel[],
  isReflexive: boolean,
): Explained {
  const descends = DESCENDING.has(name);
  const upward = descends ? converseOf(matrix) : matrix;
  const { classes, order } = isReflexive
    ? classesOf(upward)
    : { classes: labels.map((_, place) => [place]), order: upward };
  const up = ({ from, to }: Other, place: number) => (descends ? to[place]! : from[place]!);
  const down = ({ from, to }: Other, place: number) => (descends ? from[place]! : to[place]!);
  const first = (of: number) => classes[of]![0]!;
  const above = (of: number, other: Other) => up(other, first(of)) && !down(other, first(of));
  const below = (of: number, other: Other) => down(other, first(of)) && !up(other, first(of));
  const equal = (of: number, other: Other) => up(other, first(of)) && down(other, first(of));
  const numbers = classes.map((_, number) => number);
  const isStrictlyBelow = (low: number, high: number) => low !== high && order[low]![high]!;
  const lies = (other: Other, of: number) => above(of, other) || below(of, other) || equal(of, other);
  const hasAbove = (of: number) =>
    others.some(
      (other) => above(of, other) && !numbers.some((high) => isStrictlyBelow(of, high) && lies(other, high)),
    );
  const hasBelow = (of: number) =>
    others.some(
      (other) => below(of, other) && !numbers.some((low) => isStrictlyBelow(low, of) && lies(other, low)),
    );

  const shown = classes.map((members, of): PointLabel => {
    const more = others.some((other) => isReflexive && equal(of, other)) ? ["…"] : [];
    if (members.length === 1 && more.length === 0) return labels[members[0]!]!;
    return [[...members.map((member) => labels[member]![0]), ...more].join(", ")];
  });
  const extents: Extent[] = shown.map(extentOf);
  const pairs: (readonly [number, number])[] = [];
  const strokes: number[] = [];
  const add = (pair: readonly [number, number], stroke: number) => {
    pairs.push(pair);
    strokes.push(stroke);
  };
  for (const [low, high] of coveringPairs(order))
    add([low, high], others.some((other) => above(low, other) && below(high, other)) ? WITH_OTHERS : PLAIN);
  const nowhere = () => extents.push(NOWHERE) - 1;
  for (const of of numbers) {
    if (hasAbove(of)) add([of, nowhere()], TO_OTHERS);
    if (hasBelow(of)) add([nowhere(), of], TO_OTHERS);
  }
  const { places, curves } = layOutLayers(extents, pairs);
  const arcs = curves.map(
    (curve, index): Arc => ({ curve, stroke: strokes[index]!, headAtEnd: false, headAtStart: false }),
  );
  const isAmong = (stroke: number) => strokes.includes(stroke);
  const isApart = others.some((other) => !numbers.some((of) => lies(other, of)));
  const left =
    coveringPairs(order).length <
    numbers.flatMap((low) => numbers.filter((high) => isStrictlyBelow(low, high))).length;
  return {
    plan: { points: pointsAt(places, extents, shown).slice(0, shown.length), arcs, frames: [] },
    remarks: [
      `${name} by ${descends ? "downward" : "upward"} lines`,
      ...(isAmong(WITH_OTHERS)
        ? [`dashed: others lie between${isAmong(PLAIN) ? "; solid: none does" : ""}`]
        : isAmong(PLAIN)
          ? ["none lies between two that a line joins"]
          : []),
      ...(isAmong(TO_OTHERS) ? ["dotted: others above or below"] : []),
      ...(isApart ? ["others are comparable to none of these"] : []),
      ...(shown.some((label) => label[0].includes(", ")) ? ["in one outline: related both ways"] : []),
      ...(isReflexive || left
        ? [
            `${enumerate([...(isReflexive ? ["loops"] : []), ...(left ? ["transitive pairs"] : [])])} left out`,
          ]
        : []),
    ],
  };
}

/** A relation without directions: in layers where its lines form no round, else on a circle. */
function planUndirected(relation: SampleRelation, labels: readonly PointLabel[], isRow: boolean): Explained {
  const { matrix, others, name } = relation;
  const edges = matrix.flatMap((row, i) =>
    row.flatMap((holds, j) => (holds && i < j ? [[i, j] as const] : [])),
  );
  const stubs = labels.flatMap((_, place) => (others.some(({ from }) => from[place]) ? [place] : []));
  const remark = `${name} is symmetric: each line stands for both directions`;
  if (hasLoops(matrix) || edges.length === 0 || !isForest(labels.length, edges)) {
    const { plan, remarks } = planRound(relation, labels);
    return { plan, remarks: [remark, ...remarks.slice(1)] };
  }
  // On a line, others are beyond the nearer end.
  const isEarly = (place: number) => isRow && place < labels.length / 2;
  const { plan } = layers(
    labels,
    edges,
    stubs.filter((place) => !isEarly(place)),
    stubs.filter(isEarly),
    isRow,
    false,
  );
  return {
    plan,
    remarks: [remark, ...(stubs.length > 0 ? ["dotted: to others"] : [])],
  };
}

/** Arrows in layers, where they form no round; null where there are too many lines to follow. */
function planLayers(
  relation: SampleRelation,
  labels: readonly PointLabel[],
  isRow: boolean,
): Explained | null {
  const { matrix, others, name } = relation;
  if (hasLoops(matrix) || !isAcyclic(matrix) || mostPredecessors(matrix) > 3) return null;
  const arcs = matrix.flatMap((row, i) => row.flatMap((holds, j) => (holds ? [[i, j] as const] : [])));
  const outward = labels.flatMap((_, place) => (others.some(({ from }) => from[place]) ? [place] : []));
  const inward = labels.flatMap((_, place) => (others.some(({ to }) => to[place]) ? [place] : []));
  if (arcs.length === 0 || arcs.length > 2 * labels.length) return null;
  if (outward.length + inward.length > labels.length + 1) return null;
  const { plan } = layers(labels, arcs, outward, inward, isRow, true);
  const dotted = [...(inward.length > 0 ? ["from"] : []), ...(outward.length > 0 ? ["to"] : [])];
  return {
    plan,
    remarks: [
      explainArrows(name, [matrix]),
      ...(dotted.length > 0 ? [`dotted: ${dotted.join(" and ")} others`] : []),
    ],
  };
}

/** @param outward elements from which a line leads to others; `inward`, to which one leads from others */
function layers(
  labels: readonly PointLabel[],
  lines: readonly (readonly [number, number])[],
  outward: readonly number[],
  inward: readonly number[],
  isRow: boolean,
  heads: boolean,
): { readonly plan: Plan } {
  const extents: Extent[] = labels.map(extentOf);
  const nowhere = () => extents.push(NOWHERE) - 1;
  const pairs = [
    ...lines,
    ...outward.map((place) => [place, nowhere()] as const),
    ...inward.map((place) => [nowhere(), place] as const),
  ];
  const { places, curves } = layOutLayers(extents, pairs, heads ? "heads" : "bare", isRow ? "right" : "up");
  const arcs = curves.map((curve, index): Arc => {
    const stroke = index < lines.length ? PLAIN : TO_OTHERS;
    return { curve, stroke, headAtEnd: heads, headAtStart: false };
  });
  const points = pointsAt(places, extents, labels).slice(0, labels.length);
  return { plan: { points, arcs, frames: [] } };
}

/** Maps with rounds and loops; null for other relations. */
function planFunctional(
  { matrix, others, name }: SampleRelation,
  labels: readonly PointLabel[],
): Explained | null {
  if (!isFunctional(matrix) && !isFunctional(converseOf(matrix))) return null;
  const style = styles.find((one) => one.name === "functional")!;
  return {
    plan: style.plan(matrix, labels, name),
    remarks: [explainArrows(name, [matrix]), ...othersRemarks({ matrix, others, name }, labels)],
  };
}

/** On a circle; where lines lead to others is said. */
function planRound(relation: SampleRelation, labels: readonly PointLabel[]): Explained {
  const { matrix, name } = relation;
  const symmetric = isSymmetric(matrix);
  return {
    plan: planCircle([matrix], labels, [symmetric]),
    remarks: [explainArrows(name, [matrix]), ...othersRemarks(relation, labels)],
  };
}

function planSeveral(relations: readonly SampleRelation[], labels: readonly PointLabel[]): Explained {
  const matrices = relations.map(({ matrix }) => matrix);
  const symmetric = matrices.map(isSymmetric);
  const remarks = ["an arrow from x to y: the relation holds of (x, y)"];
  if (symmetric.includes(true)) remarks.push("a line without heads: of both directions");
  const joined = relations.filter(({ others }) => others.some(isRelated)).map(({ name }) => name);
  return {
    plan: planCircle(matrices, labels, symmetric),
    remarks: [
      ...remarks,
      ...(joined.length === 0
        ? []
        : [`${enumerate(joined)} ${joined.length === 1 ? "holds" : "hold"} of these and others too`]),
    ],
  };
}

/** Which elements are related to others that are not drawn. */
function othersRemarks({ others }: SampleRelation, labels: readonly PointLabel[]): readonly string[] {
  const related = labels.flatMap(([name], place) =>
    others.some(({ from, to }) => from[place] || to[place]) ? [name] : [],
  );
  if (related.length === 0) return ["none of these is related to others"];
  const whose = related.length === labels.length ? "each of these" : enumerate(related);
  return [
    `${whose} ${related.length === 1 || related.length === labels.length ? "is" : "are"} related to others too`,
  ];
}

function isRelated({ from, to }: Other): boolean {
  return from.includes(true) || to.includes(true);
}

/** Whether undirected lines form no round. */
function isForest(count: number, edges: readonly (readonly [number, number])[]): boolean {
  const part = Array.from({ length: count }, (_, place) => place);
  for (const [i, j] of edges) {
    if (part[i] === part[j]) return false;
    const [kept, gone] = [part[i]!, part[j]!];
    part.forEach((one, place) => {
      if (one === gone) part[place] = kept;
    });
  }
  return true;
}

function legendOf(relations: readonly SampleRelation[]): readonly LegendEntry[] {
  if (relations.length === 1) return [];
  return relations.map(({ name, matrix }, stroke) => ({
    name: shorten(name, 24),
    stroke,
    heads: !isSymmetric(matrix),
  }));
}

function altText(relations: readonly SampleRelation[], { elements }: Sample, caption: string): string {
  const sentences = relations.map(
    ({ name, matrix }) => `Among them ${name} holds of ${pairsText(matrix, elements)}.`,
  );
  return [
    `Drawing of ${elements.length} of infinitely many elements.`,
    ...sentences,
    `Drawn: ${caption}.`,
  ].join(" ");
}

function pairsText(matrix: Matrix, elements: Sample["elements"]): string {
  const pairs = matrix.flatMap((row, i) =>
    row.flatMap((holds, j) => (holds ? [`(${elements[i]!.name},${elements[j]!.name})`] : [])),
  );
  return pairs.length === 0 ? "nothing" : enumerate(pairs);
}
