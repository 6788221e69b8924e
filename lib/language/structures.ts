/**
 * Structures written out: `points 3 where R is { (1,2), (2,3) } and S is { (1,1) }`, and on infinite domains
 * `dense-line where Rxy iff x < y`.
 */
import { listTuples } from "../carriers/defined.ts";
import type { RelationSymbol } from "../logic/formula.ts";
import {
  LARGEST_TABLES,
  type ListedRelation,
  type StructureDefinition,
} from "../logic/structure-definition.ts";
import { acceptSeparator, isCarrierAhead, isWord, readCarrier } from "./carriers.ts";
import type { Token } from "./lexer.ts";
import { readWhole } from "./numbers.ts";
import { quote, type Reader, Unreadable } from "./reader.ts";
import type { NamedStructure } from "./statements.ts";
import { DefinitionReader, isDefinitionAhead, resolveRelation } from "./structure-definitions.ts";
import { countOf } from "./wording.ts";

/** Whether a structure expression comes next. */
export function isStructureAhead(reader: Reader): boolean {
  if (isCarrierAhead(reader)) return true;
  const token = reader.peek();
  if (token.kind !== "word") return false;
  const named = reader.names.find(token.text);
  return named?.kind === "structure" || (named?.kind === "damaged" && named.as === "structure");
}

/** Reads the name of a structure or one written out; null after a mistake. */
export function readStructure(reader: Reader): NamedStructure | null {
  const first = reader.peek();
  if (!isCarrierAhead(reader)) {
    reader.next();
    const named = reader.names.find(first.text);
    return named?.kind === "structure" ? { text: first.text, structure: named.definition.structure } : null;
  }
  const structure = readWritten(reader);
  return structure === null ? null : { text: reader.excerpt(first, reader.last), structure };
}

function readWritten(reader: Reader): StructureDefinition | null {
  const mistakes = reader.diagnostics.length;
  const isPoints = isWord(reader.peek(), "points");
  const carrier = readCarrier(reader);
  // A product of points and others begins with points as well.
  const isListed = carrier === null ? isPoints : carrier.description.kind === "points";
  const size = carrier?.description.kind === "points" ? carrier.description.size : null;
  const seen = new Set<string>();
  const tables: ListedRelation[] = [];
  const definitions = new DefinitionReader(reader, carrier, seen);
  if (isWord(reader.peek(), "where")) {
    reader.next();
    reader.crossLine();
    do {
      if (!isListed || isDefinitionAhead(reader)) definitions.read();
      else {
        const table = readTable(reader, size, seen);
        if (table !== null) tables.push(table);
      }
    } while (acceptSeparator(reader));
  }
  const defined = definitions.finish();
  if (defined === null || reader.diagnostics.length > mistakes) return null;
  const { carrier: fitted, relations } = defined;
  return fitted.kind === "points"
    ? { carrier: fitted, relations: [...tables, ...relations.map((one) => listTuples(fitted, one))] }
    : { carrier: fitted, relations };
}

/** Reads `R is { (1,2) }`. */
function readTable(reader: Reader, size: number | null, seen: Set<string>): ListedRelation | null {
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
  if (!isWord(reader.peek(), "is")) reader.failExpected("`is`", `write \`${name.token.text} is { … }\``);
  reader.next();
  reader.crossLine();
  const tuples = readTuples(reader, name.token.text, name.relation, size);
  return name.relation === null ? null : { relation: name.relation, tuples };
}

interface RelationName {
  readonly token: Token;
  /** Null when it is unknown, which has been reported, or damaged. */
  readonly relation: RelationSymbol | null;
}

function readRelationName(reader: Reader): RelationName {
  const token = reader.peek();
  if (token.kind !== "word" && token.kind !== "relation-sign") reader.failExpected("the name of a relation");
  reader.next();
  return { token, relation: resolveRelation(reader, token, token.text) };
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
