/** Measures what a picture shows, from its SVG alone, and lists everything in it that overlaps. */
import { readMarkup } from "./markup.ts";

interface Spot {
  readonly x: number;
  readonly y: number;
}

/** A point's outline by its middle, half its width and half its height. */
interface Outline extends Spot {
  readonly rx: number;
  readonly ry: number;
  readonly isBox: boolean;
}

interface Line {
  /** Close together along the curve. */
  readonly spots: readonly Spot[];
  /** The outlines at its two ends, by number. */
  readonly ends: readonly [number, number];
}

/** Pixels between things that must be told apart. */
const APART = 3;
/** Pixels from a point's outline within which its own lines may meet: heads are that long. */
const AT_POINT = 12;
/** Lines may cross; this share of one may lie within {@link APART} pixels of another. */
const CROSSING_SHARE = 0.25;

/** What overlaps, in words; empty for a good picture. */
export function findOverlaps(svg: string): readonly string[] {
  const { elements } = readMarkup(svg, []);
  const number = (index: number, key: string) => Number(elements[index]!.attributes.get(key));
  const outlines: Outline[] = [];
  const frames: Outline[] = [];
  const curves: Spot[][] = [];
  const heads: Spot[] = [];
  elements.forEach(({ name, attributes }, index) => {
    if (name === "circle" || name === "ellipse") {
      const [rx, ry] = name === "circle" ? ["r", "r"] : ["rx", "ry"];
      outlines.push({
        x: number(index, "cx"),
        y: number(index, "cy"),
        rx: number(index, rx!),
        ry: number(index, ry!),
        isBox: false,
      });
    } else if (name === "rect" && index > 1) {
      const [rx, ry] = [number(index, "width") / 2, number(index, "height") / 2];
      const box = { x: number(index, "x") + rx, y: number(index, "y") + ry, rx, ry, isBox: true };
      (attributes.get("fill") === "none" ? frames : outlines).push(box);
    } else if (name === "path") curves.push(spotsOf(attributes.get("d")!));
    else if (name === "polygon") heads.push(middleOf(attributes.get("points")!));
  });
  return [
    ...pointsTooClose(outlines),
    ...frameTroubles(frames, outlines),
    ...lineTroubles(
      curves.map((spots) => lineOf(spots, outlines)),
      outlines,
    ),
    ...headTroubles(heads, outlines),
  ];
}

function pointsTooClose(outlines: readonly Outline[]): readonly string[] {
  return pairs(outlines).flatMap(([a, b, i, j]) =>
    gapBetween(a, b) < APART ? [`points ${i} and ${j} touch`] : [],
  );
}

function frameTroubles(frames: readonly Outline[], outlines: readonly Outline[]): readonly string[] {
  if (frames.length === 0) return [];
  const troubles = pairs(frames).flatMap(([a, b, i, j]) =>
    gapBetween(a, b) < APART ? [`frames ${i} and ${j} touch`] : [],
  );
  outlines.forEach((point, index) => {
    const around = frames.filter(
      (frame) =>
        Math.abs(point.x - frame.x) + point.rx <= frame.rx - APART &&
        Math.abs(point.y - frame.y) + point.ry <= frame.ry - APART,
    );
    if (around.length !== 1) troubles.push(`point ${index} lies in ${around.length} frames`);
  });
  return troubles;
}

function lineTroubles(lines: readonly Line[], outlines: readonly Outline[]): readonly string[] {
  const troubles: string[] = [];
  lines.forEach(({ spots, ends }, index) => {
    outlines.forEach((point, number) => {
      const least = Math.min(...spots.map((spot) => distanceTo(point, spot)));
      const allowed = ends.includes(number) ? -2 : APART;
      if (least < allowed) troubles.push(`line ${index} runs over point ${number}`);
    });
  });
  for (const [a, b, i, j] of pairs(lines)) {
    const shared = a.ends.filter((end) => b.ends.includes(end)).map((end) => outlines[end]!);
    const free = a.spots.filter((spot) => shared.every((point) => distanceTo(point, spot) > AT_POINT));
    const near = free.filter((spot) =>
      b.spots.some((other) => Math.hypot(spot.x - other.x, spot.y - other.y) < APART),
    );
    const isLoop = a.ends[0] === a.ends[1] || b.ends[0] === b.ends[1];
    if (near.length > (isLoop ? 0 : free.length * CROSSING_SHARE))
      troubles.push(`lines ${i} and ${j} lie on each other`);
  }
  return troubles;
}

function headTroubles(heads: readonly Spot[], outlines: readonly Outline[]): readonly string[] {
  const close = pairs(heads).flatMap(([a, b, i, j]) =>
    Math.hypot(a.x - b.x, a.y - b.y) < 6 ? [`heads ${i} and ${j} lie on each other`] : [],
  );
  const hidden = heads.flatMap((head, index) =>
    outlines.some((point) => distanceTo(point, head) < 2) ? [`head ${index} lies in a point`] : [],
  );
  return [...close, ...hidden];
}

function lineOf(spots: readonly Spot[], outlines: readonly Outline[]): Line {
  const nearest = (spot: Spot) => {
    const distances = outlines.map((point) => distanceTo(point, spot));
    return distances.indexOf(Math.min(...distances));
  };
  return { spots, ends: [nearest(spots[0]!), nearest(spots.at(-1)!)] };
}

/** Pixels from an outline, negative inside; for ellipses a close estimate along the ray from the middle. */
function distanceTo({ x, y, rx, ry, isBox }: Outline, spot: Spot): number {
  const [dx, dy] = [Math.abs(spot.x - x), Math.abs(spot.y - y)];
  if (isBox) {
    const [outX, outY] = [dx - rx, dy - ry];
    if (outX <= 0 && outY <= 0) return Math.max(outX, outY);
    return Math.hypot(Math.max(outX, 0), Math.max(outY, 0));
  }
  const length = Math.hypot(dx, dy);
  if (length === 0) return -Math.min(rx, ry);
  return length - 1 / Math.hypot(dx / length / rx, dy / length / ry);
}

/** Between two outlines: exact for circles, between bounding boxes otherwise. */
function gapBetween(a: Outline, b: Outline): number {
  const [dx, dy] = [Math.abs(a.x - b.x), Math.abs(a.y - b.y)];
  if (!a.isBox && !b.isBox && a.rx === a.ry && b.rx === b.ry) return Math.hypot(dx, dy) - a.rx - b.rx;
  return Math.max(dx - a.rx - b.rx, dy - a.ry - b.ry);
}

/** Every cubic in 24 parts. */
function spotsOf(path: string): Spot[] {
  const numbers = path.match(/-?[\d.]+/g)!.map(Number);
  const controls: Spot[] = [];
  for (let index = 0; index + 1 < numbers.length; index += 2)
    controls.push({ x: numbers[index]!, y: numbers[index + 1]! });
  const spots = [controls[0]!];
  for (let start = 0; start + 3 < controls.length; start += 3)
    for (let step = 1; step <= 24; step += 1) {
      const t = step / 24;
      const weights = [(1 - t) ** 3, 3 * t * (1 - t) ** 2, 3 * t ** 2 * (1 - t), t ** 3];
      spots.push({
        x: weights.reduce((sum, weight, index) => sum + weight * controls[start + index]!.x, 0),
        y: weights.reduce((sum, weight, index) => sum + weight * controls[start + index]!.y, 0),
      });
    }
  return spots;
}

function middleOf(points: string): Spot {
  const corners = points.split(" ").map((corner) => corner.split(",").map(Number));
  return {
    x: corners.reduce((sum, [x]) => sum + x!, 0) / corners.length,
    y: corners.reduce((sum, [, y]) => sum + y!, 0) / corners.length,
  };
}

function pairs<Item>(items: readonly Item[]): readonly (readonly [Item, Item, number, number])[] {
  return items.flatMap((a, i) => items.slice(i + 1).map((b, k) => [a, b, i, i + 1 + k] as const));
}
