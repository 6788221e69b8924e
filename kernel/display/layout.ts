/** Where points and arcs go: layers from Graphviz for what has an up and a down; a circle; frames around classes. */
import { instance, type Viz } from "@viz-js/viz";

export interface Place {
  readonly x: number;
  readonly y: number;
}

/** The size of a point's outline. */
export interface Extent {
  readonly width: number;
  readonly height: number;
  /** `round` is a circle where width and height are equal, else an ellipse; `box` has rounded corners; `none` is bare text. */
  readonly outline: "round" | "box" | "none";
}

/** A frame around points, by its upper left corner. */
export interface Frame extends Place {
  readonly width: number;
  readonly height: number;
}

/** Control points of a chain of cubic curves: 1, then 3 for every curve. */
export type Spline = readonly Place[];

let graphviz: Viz | null = null;

/** Loads the layout engine; layouts are computed without waiting afterwards. Harmless when called again. */
export async function prepareLayout(): Promise<void> {
  graphviz ??= await instance();
}

const POINTS_PER_INCH = 72;

/**
 * Layers bottom to top, every arc going upwards; or left to right.
 * @param arcs pairs counted from 0 that form no cycle
 * @param ends lines with heads get more room
 * @returns places of the points and the arcs' curves in the order given, y growing downwards
 * @throws Error when {@link prepareLayout} has not been awaited
 */
export function layOutLayers(
  extents: readonly Extent[],
  arcs: readonly (readonly [number, number])[],
  ends: "bare" | "heads" = "bare",
  direction: "up" | "right" = "up",
): { readonly places: readonly Place[]; readonly curves: readonly Spline[] } {
  if (graphviz === null) throw new Error("prepareDrawing has not been awaited");
  const nodes = extents.map(
    ({ width, height, outline }, index) =>
      `n${index}[shape=${outline === "box" ? "box" : "ellipse"},width=${(width / POINTS_PER_INCH).toFixed(3)},height=${(height / POINTS_PER_INCH).toFixed(3)}];`,
  );
  const edges = arcs.map(([from, to]) => `n${from}->n${to};`);
  const drawn = graphviz.renderJSON(
    `digraph{rankdir=${direction === "up" ? "BT" : "LR"};${ends === "bare" ? "nodesep=0.35;ranksep=0.36;" : "nodesep=0.45;ranksep=0.5;"}node[fixedsize=true,label=""];edge[dir=none];${nodes.join("")}${edges.join("")}}`,
    { engine: "dot" },
  ) as {
    bb: string;
    objects?: { name: string; pos: string }[];
    edges?: { tail: number; head: number; pos: string }[];
  };
  const top = Number(drawn.bb.split(",")[3]);
  const read = (pair: string): Place => {
    const [x, y] = pair.split(",").map(Number);
    return { x: x!, y: top - y! };
  };
  const places = new Array<Place>(extents.length);
  const numbers: number[] = [];
  for (const object of drawn.objects ?? []) {
    const number = Number(object.name.slice(1));
    numbers.push(number);
    places[number] = read(object.pos);
  }
  const curves = new Map<string, Spline>();
  for (const edge of drawn.edges ?? [])
    curves.set(`${numbers[edge.tail]},${numbers[edge.head]}`, edge.pos.split(" ").map(read));
  return { places, curves: arcs.map(([from, to]) => curves.get(`${from},${to}`)!) };
}

/** Lines at one point that need no more room than its outline gives. */
const EASY_LINES = 4;

/**
 * Points clockwise on a circle, the first on top; one point stands in the middle.
 * @param relations how many of them may hold between the same two points
 * @param lines how many lines end at one point at most
 */
export function layOutCircle(extents: readonly Extent[], relations: number, lines: number): readonly Place[] {
  const count = extents.length;
  if (count === 1) return [{ x: 0, y: 0 }];
  const widest = Math.max(...extents.map(({ width }) => width));
  // Lines that are bent apart need room between neighbours.
  const gap = 26 + 24 * (relations - 1) + 7 * Math.max(0, lines - EASY_LINES);
  const radius = Math.max(44, (count * (widest + gap)) / (2 * Math.PI));
  if (count === 2)
    return [
      { x: -radius, y: 0 },
      { x: radius, y: 0 },
    ];
  return extents.map((_, index) => {
    const angle = (2 * Math.PI * index) / count;
    return { x: radius * Math.sin(angle), y: -radius * Math.cos(angle) };
  });
}

/** Width at which things that stand side by side go on below. */
const ROW_WIDTH = 420;
const BETWEEN = 22;

/**
 * Boxes side by side, in rows; the middles of a row are at one height.
 * @returns the upper left corner of each
 */
export function layOutRows(
  boxes: readonly { readonly width: number; readonly height: number }[],
): readonly Place[] {
  const rows: number[][] = [];
  let used = 0;
  boxes.forEach(({ width }, index) => {
    const row = rows.at(-1);
    if (row === undefined || used + BETWEEN + width > ROW_WIDTH) {
      rows.push([index]);
      used = width;
    } else {
      row.push(index);
      used += BETWEEN + width;
    }
  });
  const places = new Array<Place>(boxes.length);
  let top = 0;
  for (const row of rows) {
    const height = Math.max(...row.map((index) => boxes[index]!.height));
    let left = 0;
    for (const index of row) {
      places[index] = { x: left, y: top + (height - boxes[index]!.height) / 2 };
      left += boxes[index]!.width + BETWEEN;
    }
    top += height + BETWEEN;
  }
  return places;
}

/** Each class of points in a frame of its own, its points in short rows; no class is empty. */
export function layOutGroups(
  extents: readonly Extent[],
  classes: readonly (readonly number[])[],
): { readonly places: readonly Place[]; readonly frames: readonly Frame[] } {
  const [padding, gap] = [9, 9];
  const width = Math.max(...extents.map((extent) => extent.width));
  const height = Math.max(...extents.map((extent) => extent.height));
  const shapes = classes.map((points) => {
    const columns = Math.ceil(Math.sqrt(points.length));
    const rows = Math.ceil(points.length / columns);
    return {
      columns,
      width: columns * (width + gap) - gap + 2 * padding,
      height: rows * (height + gap) - gap + 2 * padding,
    };
  });
  const corners = layOutRows(shapes);
  const places = new Array<Place>(extents.length);
  const frames = shapes.map((shape, index): Frame => {
    const corner = corners[index]!;
    classes[index]!.forEach((point, position) => {
      const [row, column] = [Math.floor(position / shape.columns), position % shape.columns];
      places[point] = {
        x: corner.x + padding + width / 2 + column * (width + gap),
        y: corner.y + padding + height / 2 + row * (height + gap),
      };
    });
    return { ...corner, width: shape.width, height: shape.height };
  });
  return { places, frames };
}
