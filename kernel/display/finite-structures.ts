/** Structures on points as tables, lists, pictures and cell text; other finite ones by their points. */
import { Points } from "../../lib/carriers/points.ts";
import { type Structure, type Table, tuplesOf } from "../../lib/carriers/structure.ts";
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

/** A structure whose carrier is points. */
export interface PointStructure extends Structure {
  readonly carrier: Points;
}

export function isOnPoints(structure: Structure): structure is PointStructure {
  return structure.carrier instanceof Points;
}

/**
 * The structure as the cell language writes it, so that it can be copied into a `define`; null when it has too many
 * tuples to be of use there.
 */
export function pointsSource(structure: PointStructure): string | null {
  const { size } = structure.carrier;
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
export function pointsBlocks(role: string, structure: PointStructure): readonly Block[] {
  const source = pointsSource(structure);
  const isShort = source !== null && source.length <= SHORT_SOURCE;
  const first = isShort
    ? line(`${role}: `, code(source))
    : line(`${role}: ${counted(structure.carrier.size, "point")}`);
  const views: Block[] = [];
  const lists: Block[] = rotationLines(structure);
  for (const { relation, holds } of structure.tables.values()) {
    if (relation.places === 2 && structure.carrier.size <= TABLE_POINTS)
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
function rotationLines(structure: PointStructure): Block[] {
  const { size } = structure.carrier;
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
function matrixTable(structure: PointStructure, name: string): TableBlock {
  const { size } = structure.carrier;
  const matrix = matrixOf(size, tuplesOf(structure, name));
  return {
    kind: "table",
    caption: null,
    head: [name, ...matrix.map((_, point) => String(point + 1))],
    rows: matrix.map((row, point) => [[String(point + 1)], ...row.map((holds) => [holds ? "1" : "0"])]),
    look: "matrix",
  };
}

/** For each relation its tuples of points counted from 1, for `eval --json`. */
export function pointsData(structure: PointStructure): Readonly<Record<string, unknown>> {
  const relations: Record<string, unknown> = {};
  for (const name of structure.tables.keys()) relations[name] = tuplesOf(structure, name);
  return relations;
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

/** Larger finite structures on other carriers are told by their definitions alone. */
const MOST_NUMBERED = 64;

/**
 * A structure on finitely many elements as one on points, which are its elements in the order in which its carrier lists
 * them; null when it is infinite or too large.
 */
export function onPoints(structure: Structure): PointStructure | null {
  if (isOnPoints(structure)) return structure;
  const { carrier } = structure;
  if (carrier.size === null || carrier.size > MOST_NUMBERED) return null;
  let all = carrier.empty;
  for (let named = 0; named < carrier.size; named += 1) {
    const next = carrier.extensions(all, 0).find((extended) => {
      for (let place = 0; place < named; place += 1) if (carrier.same(extended, place, named)) return false;
      return true;
    });
    if (next === undefined) throw new Error(`a carrier of ${carrier.size} elements lists ${named}`);
    all = next;
  }
  const points = new Points(carrier.size);
  const tables = new Map<string, Table>();
  for (const [name, { relation, holds }] of structure.tables) {
    const numbered = new Uint8Array(points.kindCount(relation.places));
    numbered.forEach((_, kind) => {
      const places = points.tupleOf(relation.places, kind).map((point) => point - 1);
      numbered[kind] = holds[carrier.kindOf(all, places)]!;
    });
    tables.set(name, { relation, holds: numbered });
  }
  return { carrier: points, tables };
}
