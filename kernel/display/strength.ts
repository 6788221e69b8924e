/** The order of strength of compared theories as a picture: stronger ones stand higher. */
import type { CompareAnswer } from "../../lib/inquiry/answer.ts";
import type { PictureBlock } from "./blocks.ts";
import { DRAWN_POINTS } from "./drawing.ts";
import { coveringPairs, type Matrix, orderKind } from "./order.ts";
import { type PointLabel, styles } from "./styles.ts";
import { renderPicture } from "./svg.ts";
import { counted, enumerate, shorten } from "./text.ts";

/** Columns of a name at a point. */
const LONGEST_NAME = 24;

/**
 * Draws which theories entail which; equivalent ones share a point.
 * @returns null for fewer than three theories, too many of them, or when nothing is known to entail anything
 */
export function drawStrength(answer: CompareAnswer): PictureBlock | null {
  const { classes, names } = answer;
  if (names.length < 3 || classes.length < 2 || classes.length > DRAWN_POINTS) return null;
  const above = entailments(answer);
  // Theories that are equivalent only by way of others would lie above each other.
  if (orderKind(above) !== "strict-order" || !above.flat().includes(true)) return null;
  const labels = classes.map(([first, ...rest]): PointLabel => {
    const name = shorten(first!, LONGEST_NAME);
    return rest.length === 0 ? [name] : [name, shorten(`= ${rest.join(", ")}`, LONGEST_NAME)];
  });
  const style = styles.find(({ name }) => name === "strict-order")!;
  const isSettled = answer.pairs.every(({ verdict }) => verdict !== "open" && !verdict.startsWith("at-"));
  const caption = `stronger theories stand higher and entail what lines lead down to${
    isSettled ? "" : "; what no line joins may be open"
  }`;
  return {
    kind: "picture",
    svg: renderPicture({ ...style.plan(above, labels, "entailed by"), legend: [] }),
    alt: describe(classes, above),
    caption,
  };
}

/** By classes: whether the second entails the first; what follows from that by transitivity too. */
function entailments({ classes, names, pairs }: CompareAnswer): Matrix {
  const classOf = names.map((name) => classes.findIndex((members) => members.includes(name)));
  const matrix = classes.map(() => classes.map(() => false));
  for (const { left, right, leftEntailsRight, rightEntailsLeft } of pairs) {
    const [first, second] = [classOf[left]!, classOf[right]!];
    if (first === second) continue;
    if (leftEntailsRight) matrix[second]![first] = true;
    if (rightEntailsLeft) matrix[first]![second] = true;
  }
  for (const middle of classes.keys())
    for (const row of matrix)
      if (row[middle]) for (const last of classes.keys()) row[last] ||= matrix[middle]![last]!;
  return matrix;
}

function describe(classes: CompareAnswer["classes"], above: Matrix): string {
  const name = (place: number) => classes[place]!.join(" = ");
  const lines = coveringPairs(above).map(([lower, higher]) => `${name(higher)} entails ${name(lower)}`);
  return `Drawing of ${counted(classes.length, "theory", "theories")}: ${enumerate(lines)}.`;
}
