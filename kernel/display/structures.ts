/** Structures as tables, lists, pictures and cell text. */
import { Points } from "../../lib/carriers/points.ts";
import { type Structure, tuplesOf } from "../../lib/carriers/structure.ts";
import { type Block, code, line, type TableBlock } from "./blocks.ts";
import { drawStructure } from "./drawing.ts";
import { differencesOf, matrixOf } from "./order.ts";
import { counted } from "./text.ts";

/** Structures with more points get lists of tuples instead of tables of 0 and 1. */
const TABLE_POINTS = 20;

/** From this many points on it is said when a relation depends on differences alone. */
const ROTATION_POINTS = 5;

/** Relations with more tuples are given by their number. */
const LISTED_TUPLES = 400;

/** Cell text longer than this is folded. */
const SHORT_SOURCE = 160;

/** How many elements: `3 points`. */
export function sizeOf(structure: Structure): string {
  return counted(pointsOf(structure).size, "point");
}

/**
 * The structure as the cell language writes it, so that it can be copied into a `define`; null when it has too many
 * tuples to be of use there.
 */
export function sourceOf(structure: Structure): string | null {
  const { size } = pointsOf(structure);
  const relations: string[] = [];
  for (const { relation, holds } of structure.tables.values()) {
    if (countOf(holds) > LISTED_TUPLES) return null;
    relations.push(`${relation.name} is ${setOf(structure, relation.name)}`);
  }
  return `points ${size}${relations.length === 0 ? "" : ` where ${relations.join(" and ")}`}`;
}

/**
 * All that is shown of a structure.
 * @param role what it is an example of, as a noun phrase: `countermodel`
 */
export function structureBlocks(role: string, structure: Structure): readonly Block[] {
  const source = sourceOf(structure);
  const isShort = source !== null && source.length <= SHORT_SOURCE;
  const first = isShort ? line(`${role}: `, code(source)) : line(`${role}: ${sizeOf(structure)}`);
  const views: Block[] = [];
  const lists: Block[] = rotationLines(structure);
  for (const { relation, holds } of structure.tables.values()) {
    if (relation.places === 2 && pointsOf(structure).size <= TABLE_POINTS)
      views.push(matrixTable(structure, relation.name));
    else if (!isShort) {
      const count = countOf(holds);
      if (count > LISTED_TUPLES) lists.push(line(`${relation.name}: ${counted(count, "tuple")}, not listed`));
      else lists.push(line(`${relation.name} = ${setOf(structure, relation.name)}`));
    }
  }
  const picture = drawStructure(structure);
  if (picture !== null) views.push(picture);
  const blocks: Block[] = [first, ...lists];
  if (views.length > 0) blocks.push({ kind: "beside", blocks: views });
  if (source !== null && !isShort)
    blocks.push({ kind: "fold", title: "as cell text", blocks: [{ kind: "source", text: source }] });
  return [{ kind: "group", blocks }];
}

/** Relations that look the same from every point of a round: on many points that says more than their pairs. */
function rotationLines(structure: Structure): Block[] {
  const { size } = pointsOf(structure);
  if (size < ROTATION_POINTS) return [];
  return [...structure.tables.values()].flatMap(({ relation }) => {
    if (relation.places !== 2) return [];
    const differences = differencesOf(matrixOf(size, tuplesOf(structure, relation.name)));
    if (differences === null || differences.length === 0 || differences.length === size) return [];
    const list = differences.length === 1 ? `is ${differences[0]}` : `is one of ${differences.join(", ")}`;
    return [line(`${relation.name} holds of (x, y) exactly when y − x modulo ${size} ${list}`)];
  });
}

/** Rows for the first place, columns for the second; 1 where the relation holds. */
function matrixTable(structure: Structure, name: string): TableBlock {
  const { size } = pointsOf(structure);
  const matrix = matrixOf(size, tuplesOf(structure, name));
  return {
    kind: "table",
    caption: null,
    head: [name, ...matrix.map((_, point) => String(point + 1))],
    rows: matrix.map((row, point) => [[String(point + 1)], ...row.map((holds) => [holds ? "1" : "0"])]),
    look: "matrix",
  };
}

/** For `eval --json`: the size, and for each relation its tuples of points counted from 1. */
export function structureData(structure: Structure): Readonly<Record<string, unknown>> {
  const relations: Record<string, unknown> = {};
  for (const name of structure.tables.keys()) relations[name] = tuplesOf(structure, name);
  return { size: pointsOf(structure).size, relations };
}

function setOf(structure: Structure, relation: string): string {
  const tuples = tuplesOf(structure, relation).map((tuple) => `(${tuple.join(",")})`);
  return tuples.length === 0 ? "{}" : `{ ${tuples.join(", ")} }`;
}

function countOf(holds: Uint8Array): number {
  let count = 0;
  for (const value of holds) count += value;
  return count;
}

function pointsOf(structure: Structure): Points {
  if (structure.carrier instanceof Points) return structure.carrier;
  throw new TypeError(`no way to show a structure on ${structure.carrier.description.kind}`);
}
