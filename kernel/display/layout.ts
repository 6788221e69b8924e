/** Where points and arcs go: layers from Graphviz for what has an up and a down, a circle for everything else. */
import { instance, type Viz } from "@viz-js/viz";

export interface Place {
  readonly x: number;
  readonly y: number;
}

/** The size of a point's outline; a circle where the two are equal. */
export interface Extent {
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
 * Layers bottom to top, every arc going upwards.
 * @param arcs pairs counted from 0 that form no cycle
 * @returns places of the points and the arcs' curves in the order given, y growing downwards
 * @throws Error when {@link prepareLayout} has not been awaited
 */
export function layOutLayers(
  extents: readonly Extent[],
  arcs: readonly (readonly [number, number])[],
): { readonly places: readonly Place[]; readonly curves: readonly Spline[] } {
  if (graphviz === null) throw new Error("prepareDrawing has not been awaited");
  const nodes = extents.map(
    ({ width, height }, index) =>
      `n${index}[width=${(width / POINTS_PER_INCH).toFixed(3)},height=${(height / POINTS_PER_INCH).toFixed(3)}];`,
  );
  const edges = arcs.map(([from, to]) => `n${from}->n${to};`);
  const drawn = graphviz.renderJSON(
    `digraph{rankdir=BT;nodesep=0.35;ranksep=0.36;node[shape=ellipse,fixedsize=true,label=""];edge[dir=none];${nodes.join("")}${edges.join("")}}`,
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

/**
 * Points clockwise on a circle, the first on top; one point stands in the middle.
 * @param relations how many of them may hold between the same two points
 */
export function layOutCircle(extents: readonly Extent[], relations: number): readonly Place[] {
  const count = extents.length;
  if (count === 1) return [{ x: 0, y: 0 }];
  const widest = Math.max(...extents.map(({ width }) => width));
  // Lines that are bent apart need room between neighbours.
  const gap = 26 + 24 * (relations - 1);
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
