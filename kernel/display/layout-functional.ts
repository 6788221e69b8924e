/** Where the points of a functional graph go: rounds as rings, what leads into them as trees around the ring. */
import { type Extent, layOutRows, type Place } from "./layout.ts";

/** The angle that points straight down, where a point that is its own successor has its loop. */
const DOWN = Math.PI / 2;

/** The sector around {@link DOWN} that such a loop needs for itself. */
const LOOP_SECTOR = (100 * Math.PI) / 180;

/** One connected part: the points of its round in order (the root alone where there is none), and who leads where. */
interface Component {
  readonly ring: readonly number[];
  readonly hasLoop: boolean;
  readonly points: readonly number[];
}

/**
 * Rounds become rings, and the points that lead into them stand outside, each farther from the middle than the next
 * point on its way. Parts that are not connected stand side by side, larger ones first.
 * @param next for each point, counted from 0, the point it leads to; null where it leads nowhere
 */
export function layOutFunctional(
  extents: readonly Extent[],
  next: readonly (number | null)[],
): readonly Place[] {
  const before = next.map((): number[] => []);
  next.forEach((target, point) => {
    if (target !== null && target !== point) before[target]!.push(point);
  });
  const parts = componentsOf(next).map((component) => layOutComponent(component, before, extents));
  const corners = layOutRows(parts);
  const places = new Array<Place>(extents.length);
  parts.forEach((part, index) => {
    const corner = corners[index]!;
    for (const [point, { x, y }] of part.places)
      places[point] = { x: corner.x + x - part.left, y: corner.y + y - part.top };
  });
  return places;
}

function componentsOf(next: readonly (number | null)[]): readonly Component[] {
  const ringOf = next.map((_, start) => {
    const walked: number[] = [];
    let point: number = start;
    while (!walked.includes(point)) {
      walked.push(point);
      const target = next[point];
      if (target === null || target === undefined) return [point];
      point = target;
    }
    const ring = walked.slice(walked.indexOf(point));
    // Every point of the part must find the same ring, so it begins with its least point.
    const least = ring.indexOf(Math.min(...ring));
    return [...ring.slice(least), ...ring.slice(0, least)];
  });
  const firsts = [...new Set(ringOf.map(([first]) => first!))].sort((a, b) => a - b);
  const components = firsts.map((first): Component => {
    const points = next.flatMap((_, point) => (ringOf[point]![0] === first ? [point] : []));
    return { ring: ringOf[first]!, hasLoop: next[first] === first, points };
  });
  return components.sort((a, b) => b.points.length - a.points.length || a.ring[0]! - b.ring[0]!);
}

interface LaidOut {
  readonly places: ReadonlyMap<number, Place>;
  readonly left: number;
  readonly top: number;
  readonly width: number;
  readonly height: number;
}

function layOutComponent(
  { ring, hasLoop }: Component,
  before: readonly (readonly number[])[],
  extents: readonly Extent[],
): LaidOut {
  const widest = Math.max(...extents.map(({ width, height }) => Math.max(width, height)));
  const onRing = new Set(ring);
  const children = (point: number) => before[point]!.filter((child) => !onRing.has(child));
  const leaves = (point: number): number =>
    Math.max(
      1,
      children(point).reduce((sum, child) => sum + leaves(child), 0),
    );
  const inner = ring.length === 1 ? 0 : Math.max(32, (ring.length * (widest + 34)) / (2 * Math.PI));

  const attempt = (step: number): Map<number, Place> => {
    const places = new Map<number, Place>();
    const put = (point: number, level: number, from: number, to: number) => {
      const radius = inner + level * step;
      const angle = (from + to) / 2;
      places.set(point, { x: radius * Math.cos(angle), y: radius * Math.sin(angle) });
      // Within this wedge a line to the next ring stays outside the ring of its beginning.
      const limit = radius === 0 ? to - from : Math.min(to - from, 2 * Math.acos(radius / (radius + step)));
      let begin = angle - limit / 2;
      const all = leaves(point);
      for (const child of children(point)) {
        const share = (limit * leaves(child)) / all;
        put(child, level + 1, begin, begin + share);
        begin += share;
      }
    };
    const whole = 2 * Math.PI;
    if (ring.length === 1) {
      const spared = hasLoop ? LOOP_SECTOR / 2 : 0;
      put(ring[0]!, 0, DOWN + spared, DOWN + whole - spared);
    } else
      ring.forEach((point, index) => {
        const angle = -DOWN + (whole * index) / ring.length;
        put(point, 0, angle - Math.PI / ring.length, angle + Math.PI / ring.length);
      });
    return places;
  };
  const isRoomy = (places: ReadonlyMap<number, Place>) => {
    const all = [...places];
    return all.every(([point, a], i) => {
      const arrivals = children(point).map((child) => {
        const { x, y } = places.get(child)!;
        return Math.atan2(y - a.y, x - a.x);
      });
      return (
        all.every(([, b], j) => i >= j || Math.hypot(a.x - b.x, a.y - b.y) >= widest + 16) &&
        areApart(arrivals)
      );
    });
  };
  let step = widest + 26;
  let places = attempt(step);
  for (let round = 0; round < 12 && !isRoomy(places); round += 1) {
    step += 12;
    places = attempt(step);
  }
  const boxes = [...places].map(([point, { x, y }]) => {
    const { width, height } = extents[point]!;
    const below = hasLoop && point === ring[0] ? 24 : 0;
    return [x - width / 2, y - height / 2, x + width / 2, y + height / 2 + below] as const;
  });
  const left = Math.min(...boxes.map(([value]) => value));
  const top = Math.min(...boxes.map(([, value]) => value));
  const right = Math.max(...boxes.map(([, , value]) => value));
  const bottom = Math.max(...boxes.map(([, , , value]) => value));
  return { places, left, top, width: right - left, height: bottom - top };
}

/** Whether lines that arrive from these directions have room for their heads. */
function areApart(angles: readonly number[]): boolean {
  return angles.every((a, i) =>
    angles.every((b, j) => i >= j || Math.abs(Math.atan2(Math.sin(a - b), Math.cos(a - b))) >= 0.42),
  );
}
