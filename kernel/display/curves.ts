/** The lines of a picture: from point to point, and from a point to itself. */
import type { Extent, Place, Spline } from "./layout.ts";
import type { Arc } from "./svg.ts";

/** A curve from one place to another, its middle moved to the side by `bend`. */
export function chord(from: Place, to: Place, bend: number): Spline {
  const length = Math.hypot(to.x - from.x, to.y - from.y);
  const side = { x: (-(to.y - from.y) / length) * bend, y: ((to.x - from.x) / length) * bend };
  // A cubic's middle lies three quarters of the way to its two inner control points.
  const at = (share: number): Place => ({
    x: from.x + (to.x - from.x) * share + (side.x * 4) / 3,
    y: from.y + (to.y - from.y) * share + (side.y * 4) / 3,
  });
  return [from, at(1 / 3), at(2 / 3), to];
}

/**
 * A loop on the side of a point that faces `angle`.
 * @param spread half the angle between its two ends, seen from the middle of the point
 */
export function loopArc(
  place: Place,
  extent: Extent,
  angle: number,
  stroke: number,
  head: boolean,
  spread = LOOP_SPREAD,
): Arc {
  const reach = 26;
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

const LOOP_SPREAD = 0.55;

/**
 * Loops side by side on the side of a point that faces `angle`, one for each stroke.
 * @param heads for each stroke, whether the loop has a head
 */
export function loopArcs(
  place: Place,
  extent: Extent,
  angle: number,
  strokes: readonly number[],
  heads: (stroke: number) => boolean,
): readonly Arc[] {
  // Beyond this sector lines to neighbours on a circle begin.
  const between = Math.min(1, 2.7 / strokes.length);
  const spread = strokes.length === 1 ? LOOP_SPREAD : between * 0.36;
  return strokes.map((stroke, index) =>
    loopArc(
      place,
      extent,
      angle + (index - (strokes.length - 1) / 2) * between,
      stroke,
      heads(stroke),
      spread,
    ),
  );
}
