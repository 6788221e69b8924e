/** The last step of a picture: points, arcs and a legend as an SVG document. */

import type { Extent, Frame, Place, Spline } from "./layout.ts";
import { displayWidth } from "./text.ts";
import { escapeHtml } from "./to-html.ts";

const CARD = "#fbfaf6";
const INK = "#20242a";
const FRAME = "#8a8a8a";
const POINT = "#ffffff";
const MARGIN = 12;
const HEAD_LENGTH = 8;
const HEAD_WIDTH = 3.6;

/** How the lines of the first, second, … relation are stroked, and the word for it; no two differ by colour alone. */
export const STROKES: readonly {
  readonly name: string;
  readonly dashes: string | null;
  readonly width: number;
}[] = [
  { name: "solid", dashes: null, width: 1.4 },
  { name: "dashed", dashes: "6 3.5", width: 1.4 },
  { name: "dotted", dashes: "1.4 3.2", width: 2 },
  { name: "dash-dotted", dashes: "9 3 1.5 3", width: 1.4 },
];

export interface DrawnPoint extends Place, Extent {
  /** The number of the point, and below it what is written there. */
  readonly lines: readonly string[];
}

export interface Arc {
  /** From its first to its last place, already ending at the outlines unless `trim` is there. */
  readonly curve: Spline;
  /** The outlines of the points at both ends, when the curve runs from centre to centre. */
  readonly trim?: readonly [Extent, Extent];
  /** An index into {@link STROKES}. */
  readonly stroke: number;
  readonly headAtEnd: boolean;
  readonly headAtStart: boolean;
}

export interface LegendEntry {
  readonly name: string;
  readonly stroke: number;
  readonly heads: boolean;
}

export interface Picture {
  readonly points: readonly DrawnPoint[];
  readonly arcs: readonly Arc[];
  /** Drawn below points and arcs. */
  readonly frames: readonly Frame[];
  /** Empty when there is one relation only. */
  readonly legend: readonly LegendEntry[];
}

/** The document; the same picture gives the same bytes. */
export function renderPicture({ points, arcs, frames, legend }: Picture): string {
  const shapes = arcs.map(renderArc);
  const box = boundsOf(points, arcs, frames);
  const legendWidth = Math.max(0, ...legend.map(({ name }) => 44 + 8 * displayWidth(name)));
  const legendHeight = legend.length === 0 ? 0 : 20 * legend.length + 8;
  const inner = Math.max(box.right - box.left, legendWidth);
  const width = inner + 2 * MARGIN;
  const height = box.bottom - box.top + legendHeight + 2 * MARGIN;
  const dx = MARGIN - box.left + (inner - (box.right - box.left)) / 2;
  const dy = MARGIN - box.top;
  const legendTop = MARGIN + box.bottom - box.top + 14;
  const samples = legend.map(({ name, stroke, heads }, row) => {
    const y = legendTop + 20 * row;
    const curve = [0, 1, 2, 3].map((step) => ({ x: MARGIN + 11 * step, y }));
    return (
      renderArc({ curve, stroke, headAtEnd: heads, headAtStart: false }) +
      `<text x="${num(MARGIN + 42)}" y="${num(y + 4.5)}" text-anchor="start">${escapeHtml(name)}</text>`
    );
  });
  return (
    `<svg xmlns="http://www.w3.org/2000/svg" width="${num(width)}" height="${num(height)}" ` +
    `viewBox="0 0 ${num(width)} ${num(height)}" font-family="sans-serif" font-size="13" fill="${INK}">` +
    `<rect x="0.5" y="0.5" width="${num(width - 1)}" height="${num(height - 1)}" rx="5" fill="${CARD}" stroke="${FRAME}"/>` +
    `<g transform="translate(${num(dx)} ${num(dy)})">${frames.map(renderFrame).join("")}${shapes.join("")}${points.map(renderPoint).join("")}</g>` +
    `${samples.join("")}</svg>`
  );
}

function renderFrame({ x, y, width, height }: Frame): string {
  return `<rect x="${num(x)}" y="${num(y)}" width="${num(width)}" height="${num(height)}" rx="9" fill="none" stroke="${INK}" stroke-width="1.4"/>`;
}

function renderPoint({ x, y, width, height, outline: shape, lines }: DrawnPoint): string {
  const outline =
    shape === "none"
      ? ""
      : shape === "box"
        ? `<rect x="${num(x - width / 2)}" y="${num(y - height / 2)}" width="${num(width)}" height="${num(height)}" rx="7" fill="${POINT}" stroke="${INK}" stroke-width="1.2"/>`
        : width === height
          ? `<circle cx="${num(x)}" cy="${num(y)}" r="${num(width / 2)}" fill="${POINT}" stroke="${INK}" stroke-width="1.2"/>`
          : `<ellipse cx="${num(x)}" cy="${num(y)}" rx="${num(width / 2)}" ry="${num(height / 2)}" fill="${POINT}" stroke="${INK}" stroke-width="1.2"/>`;
  const texts = lines.map((text, index) => {
    const offset = lines.length === 1 ? 4.5 : index === 0 ? -2.5 : 9.5;
    const size = index === 0 ? "" : ` font-size="10.5"`;
    return `<text x="${num(x)}" y="${num(y + offset)}" text-anchor="middle"${size}>${escapeHtml(text)}</text>`;
  });
  return outline + texts.join("");
}

function renderArc(arc: Arc): string {
  const { dashes, width } = STROKES[arc.stroke]!;
  let curve = arc.curve;
  if (arc.trim !== undefined) curve = trimmed(curve, arc.trim);
  const heads: string[] = [];
  if (arc.headAtEnd) {
    heads.push(renderHead(curve.at(-1)!, awayFrom(curve)));
    curve = shortened(curve);
  }
  if (arc.headAtStart) {
    const reversed = [...curve].reverse();
    heads.push(renderHead(reversed.at(-1)!, awayFrom(reversed)));
    curve = shortened(reversed);
  }
  const [first, ...rest] = curve;
  const pieces: string[] = [];
  for (let index = 0; index < rest.length; index += 3)
    pieces.push(
      `C${rest
        .slice(index, index + 3)
        .map(({ x, y }) => `${num(x)} ${num(y)}`)
        .join(" ")}`,
    );
  const dash = dashes === null ? "" : ` stroke-dasharray="${dashes}"`;
  return (
    `<path d="M${num(first!.x)} ${num(first!.y)}${pieces.join("")}" fill="none" stroke="${INK}" ` +
    `stroke-width="${width}"${dash}/>${heads.join("")}`
  );
}

/** The direction in which a curve arrives at its end, as a unit vector. */
function awayFrom(curve: Spline): Place {
  const end = curve.at(-1)!;
  for (let index = curve.length - 2; index >= 0; index -= 1) {
    const before = curve[index]!;
    const length = Math.hypot(end.x - before.x, end.y - before.y);
    if (length > 0.01) return { x: (end.x - before.x) / length, y: (end.y - before.y) / length };
  }
  return { x: 0, y: -1 };
}

function renderHead(tip: Place, direction: Place): string {
  const base = { x: tip.x - direction.x * HEAD_LENGTH, y: tip.y - direction.y * HEAD_LENGTH };
  const side = { x: -direction.y * HEAD_WIDTH, y: direction.x * HEAD_WIDTH };
  const corners = [
    tip,
    { x: base.x + side.x, y: base.y + side.y },
    { x: base.x - side.x, y: base.y - side.y },
  ];
  return `<polygon points="${corners.map(({ x, y }) => `${num(x)},${num(y)}`).join(" ")}"/>`;
}

/** The curve ending where its head begins. */
function shortened(curve: Spline): Spline {
  const direction = awayFrom(curve);
  const end = curve.at(-1)!;
  const back = (place: Place): Place => ({
    x: place.x - direction.x * (HEAD_LENGTH - 1),
    y: place.y - direction.y * (HEAD_LENGTH - 1),
  });
  return [...curve.slice(0, -2), back(curve.at(-2)!), back(end)];
}

/** The part of a single cubic outside the outlines around its two ends. */
function trimmed(curve: Spline, [start, end]: readonly [Extent, Extent]): Spline {
  const inside = (place: Place, centre: Place, extent: Extent) =>
    ((place.x - centre.x) / (extent.width / 2 + 1)) ** 2 +
      ((place.y - centre.y) / (extent.height / 2 + 1)) ** 2 <
    1;
  const leave = (from: number, to: number, centre: Place, extent: Extent) => {
    let [within, without] = [from, to];
    for (let round = 0; round < 24; round += 1) {
      const middle = (within + without) / 2;
      if (inside(pointAt(curve, middle), centre, extent)) within = middle;
      else without = middle;
    }
    return without;
  };
  const first = leave(0, 0.5, curve[0]!, start);
  const last = leave(1, 0.5, curve[3]!, end);
  return part(curve, first, last);
}

function pointAt(curve: Spline, t: number): Place {
  const weights = [(1 - t) ** 3, 3 * t * (1 - t) ** 2, 3 * t ** 2 * (1 - t), t ** 3];
  let [x, y] = [0, 0];
  weights.forEach((weight, index) => {
    x += weight * curve[index]!.x;
    y += weight * curve[index]!.y;
  });
  return { x, y };
}

/** The part of a cubic between two parameters, as a cubic: its ends and its scaled tangents there. */
function part(curve: Spline, from: number, to: number): Spline {
  const tangent = (t: number): Place => {
    const weights = [(1 - t) ** 2, 2 * t * (1 - t), t ** 2];
    let [x, y] = [0, 0];
    weights.forEach((weight, index) => {
      x += 3 * weight * (curve[index + 1]!.x - curve[index]!.x);
      y += 3 * weight * (curve[index + 1]!.y - curve[index]!.y);
    });
    return { x, y };
  };
  const [start, end] = [pointAt(curve, from), pointAt(curve, to)];
  const [leaving, arriving] = [tangent(from), tangent(to)];
  const third = (to - from) / 3;
  return [
    start,
    { x: start.x + leaving.x * third, y: start.y + leaving.y * third },
    { x: end.x - arriving.x * third, y: end.y - arriving.y * third },
    end,
  ];
}

/** A box around everything; a cubic lies within its control points. */
function boundsOf(points: readonly DrawnPoint[], arcs: readonly Arc[], frames: readonly Frame[]) {
  const xs = points.flatMap(({ x, width }) => [x - width / 2, x + width / 2]);
  const ys = points.flatMap(({ y, height }) => [y - height / 2, y + height / 2]);
  for (const { x, y, width, height } of frames) {
    xs.push(x, x + width);
    ys.push(y, y + height);
  }
  for (const { curve } of arcs)
    for (let start = 0; start + 3 < curve.length; start += 3)
      for (let step = 0; step <= 10; step += 1) {
        const { x, y } = pointAt(curve.slice(start, start + 4), step / 10);
        xs.push(x - 5, x + 5);
        ys.push(y - 5, y + 5);
      }
  return { left: Math.min(...xs), right: Math.max(...xs), top: Math.min(...ys), bottom: Math.max(...ys) };
}

function num(value: number): string {
  const rounded = Math.round(value * 100) / 100;
  return String(Object.is(rounded, -0) ? 0 : rounded);
}
