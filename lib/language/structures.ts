/** Structures written out: `points 3 where R is { (1,2), (2,3) } and S is { (1,1) }`. */
import type { RelationSymbol } from "../logic/formula.ts";
import {
  LARGEST_DOMAIN,
  LARGEST_TABLES,
  type RelationDefinition,
  type StructureDefinition,
} from "../logic/structure-definition.ts";
import type { Token } from "./lexer.ts";
import { readWhole } from "./numbers.ts";
import { quote, type Reader, Unreadable } from "./reader.ts";
import type { NamedStructure } from "./statements.ts";
import { countOf, kindText } from "./wording.ts";

/** Whether a structure expression comes next. */
export function isStructureAhead(reader: Reader): boolean {
  const token = reader.peek();
  if (token.kind !== "word") return false;
  if (token.text === "points") return true;
  const named = reader.names.find(token.text);
  return named?.kind === "structure" || (named?.kind === "damaged" && named.as === "structure");
}

/** Reads the name of a structure or one written out; null after a mistake. */
export function readStructure(reader: Reader): NamedStructure | null {
  const first = reader.next();
  if (first.text !== "points") {
    const named = reader.names.find(first.text);
    return named?.kind === "structure" ? { text: first.text, structure: named.definition.structure } : null;
  }
  const mistakes = reader.diagnostics.length;
  const size = readWhole(reader, "how many points there are", LARGEST_DOMAIN);
  const relations = reader.acceptWord("where") === null ? [] : readRelations(reader, size);
  if (reader.diagnostics.length > mistakes || size === null) return null;
  const structure: StructureDefinition = { carrier: { kind: "points", size }, relations };
  return { text: reader.excerpt(first, reader.last), structure };
}

function readRelations(reader: Reader, size: number | null): readonly RelationDefinition[] {
  const found: RelationDefinition[] = [];
  const seen = new Set<string>();
  reader.crossLine();
  for (;;) {
    const name = readRelationName(reader);
    if (seen.has(name.token.text))
      reader.report(
        "relation-twice",
        name.token,
        `the tuples of ${quote(name.token.text)} are given twice`,
        "put them into one list",
      );
    seen.add(name.token.text);
    checkTable(reader, name, size);
    reader.expectWord("is", `write \`${name.token.text} is { … }\``);
    reader.crossLine();
    const tuples = readTuples(reader, name.token.text, name.relation, size);
    if (name.relation !== null) found.push({ relation: name.relation, tuples });
    if (reader.accept("and") === null && reader.accept("comma") === null) return found;
    reader.crossLine();
  }
}

interface RelationName {
  readonly token: Token;
  /** Null when it is unknown, which has been reported, or damaged. */
  readonly relation: RelationSymbol | null;
}

function readRelationName(reader: Reader): RelationName {
  const token = reader.peek();
  if (token.kind !== "word" && token.kind !== "relation-sign") reader.failExpected("the name of a relation");
  const named = reader.names.find(token.text);
  reader.next();
  if (named?.kind === "relation") return { token, relation: named.relation };
  if (named?.kind === "damaged") return { token, relation: null };
  if (named !== null)
    reader.report(
      "wrong-kind",
      token,
      `${quote(token.text)} is ${kindText(named.kind)}, where a relation is expected`,
    );
  else {
    const near = reader.names.nearest(token.text, ["relation"]);
    reader.report(
      "unknown-name",
      token,
      `there is no relation ${quote(token.text)}`,
      near !== null
        ? `write \`${near}\``
        : `declare it: \`relation ${token.text}${token.kind === "word" ? "" : " infix"}\``,
    );
  }
  return { token, relation: null };
}

function checkTable(reader: Reader, { token, relation }: RelationName, size: number | null): void {
  if (relation === null || size === null || size ** relation.places <= LARGEST_TABLES) return;
  reader.report(
    "size-too-large",
    token,
    `${quote(relation.name)} would have ${size}^${relation.places} tuples to decide on; the most is ${LARGEST_TABLES}`,
    "take fewer points",
  );
}

/** Reads `{ (1,2), (2,3) }`; reports every tuple that is wrong. */
function readTuples(
  reader: Reader,
  name: string,
  relation: RelationSymbol | null,
  size: number | null,
): readonly (readonly number[])[] {
  const open = reader.expect("open-brace", `write \`${name} is { (1,2) }\``);
  const { inTheory } = reader;
  reader.inTheory = false;
  try {
    return reader.withLines(false, () => readTupleList(reader, open, name, relation, size));
  } finally {
    reader.inTheory = inTheory;
  }
}

function readTupleList(
  reader: Reader,
  open: Token,
  name: string,
  relation: RelationSymbol | null,
  size: number | null,
): readonly (readonly number[])[] {
  const found = new Map<string, readonly number[]>();
  if (reader.accept("close-brace") !== null) return [];
  for (;;) {
    const first = reader.peek();
    const tuple = readTuple(reader, open, size);
    const place = { from: first.from, to: reader.last.to };
    if (tuple !== null && relation !== null && tuple.length !== relation.places)
      reader.report(
        "places-differ",
        place,
        `${quote(name)} has ${countOf(relation.places, "place")}, and this tuple has ${countOf(tuple.length, "point")}`,
      );
    else if (tuple !== null) found.set(tuple.join(), tuple);
    if (reader.accept("close-brace") !== null) return [...found.values()];
    if (reader.accept("comma") !== null) continue;
    if (reader.at("end")) reader.fail("missing-bracket", open, "this `{` is not closed", "put in a `}`");
    reader.failExpected("`,` or `}`");
  }
}

/** Reads `(1,2)`, or `1` for one point; null after a mistake. */
function readTuple(reader: Reader, brace: Token, size: number | null): readonly number[] | null {
  if (reader.at("number") || reader.at("minus")) {
    const point = readPoint(reader, size);
    return point === null ? null : [point];
  }
  if (reader.at("end")) reader.fail("missing-bracket", brace, "this `{` is not closed", "put in a `}`");
  if (!reader.at("open"))
    reader.failExpected("a tuple of points such as `(1,2)`", "points are called 1, 2, 3, …");
  const mark = reader.mark;
  const open = reader.next();
  const points: number[] = [];
  let sound = true;
  try {
    for (;;) {
      const point = readPoint(reader, size);
      if (point === null) sound = false;
      else points.push(point);
      if (reader.accept("close") !== null) return sound ? points : null;
      if (reader.accept("comma") !== null) continue;
      reader.close(open, "`,` or `)`");
    }
  } catch (error) {
    if (!(error instanceof Unreadable) || !reader.skipGroup(mark)) throw error;
    return null;
  }
}

function readPoint(reader: Reader, size: number | null): number | null {
  if (!reader.at("number") && !reader.at("minus"))
    reader.failExpected("a point", "points are called 1, 2, 3, …");
  const first = reader.peek();
  const mistakes = reader.diagnostics.length;
  const point = readWhole(reader, "a point");
  if (point === null || size === null || point <= size || reader.diagnostics.length > mistakes) return point;
  reader.report(
    "point-out-of-range",
    { from: first.from, to: reader.last.to },
    `there is no point ${point}: the points are ${size === 1 ? "1 alone" : `1 to ${size}`}`,
  );
  return null;
}
