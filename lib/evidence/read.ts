/**
 * Reading evidence: from JSON of unknown origin to typed records, or a refusal that names the place. Nothing that
 * is not in the format passes: no foreign keys, no missing ones, no formula with free variables.
 */
import { type Formula, falsum, freeVariables, quantify, type Variable, verum } from "../logic/formula.ts";
import { type CarrierDescription, LARGEST_DOMAIN } from "../logic/structure-definition.ts";
import {
  EVIDENCE_FORMAT,
  EVIDENCE_VERSION,
  type Evidence,
  type StructureRecord,
  type TableRecord,
  THEORY_QUESTIONS,
  type TheoryQuestion,
} from "./format.ts";

/** Thrown while reading and checking, caught by the checker: evidence that does not bear out its verdict. */
export class Rejected extends Error {}

export function reject(message: string): never {
  throw new Rejected(message);
}

/** Nesting of formulas beyond which evidence is refused, so that no recursion here runs out of stack. */
const DEEPEST = 2_000;

/** Evidence of the right shape; its sentences as formulas. */
export interface ReadEvidence {
  readonly evidence: Evidence;
  readonly formulas: readonly Formula[];
}

/** @throws Rejected */
export function readEvidence(value: unknown): ReadEvidence {
  const evidence = readKeys(value, "evidence", [
    "format",
    "version",
    "sentences",
    "question",
    "digest",
    "verdict",
    "facts",
  ]);
  if (evidence.format !== EVIDENCE_FORMAT) reject("this is not Twoplace evidence");
  if (evidence.version !== EVIDENCE_VERSION)
    reject(`evidence of version ${show(evidence.version)}; this checker reads version ${EVIDENCE_VERSION}`);
  const formulas = readList(evidence.sentences, "sentences").map((record, index) => {
    const formula = readFormula(record, `sentence ${index}`, 0);
    const free = freeVariables(formula);
    if (free.length > 0) reject(`sentence ${index} has the free variable ${free[0]}`);
    return formula;
  });
  readQuestion(evidence.question, formulas.length);
  if (typeof evidence.digest !== "string") reject("the digest is not a text");
  readVerdict(evidence.verdict);
  for (const [index, fact] of readList(evidence.facts, "facts").entries())
    readFact(fact, `fact ${index}`, formulas.length);
  return { evidence: value as Evidence, formulas };
}

function readQuestion(value: unknown, count: number): void {
  const ask = (value as { ask?: unknown } | null)?.ask;
  const at = "the question";
  switch (ask) {
    case "entails":
    case "does-not-entail": {
      const question = readKeys(value, at, ["ask", "premises", "conclusion"]);
      readTheory(question.premises, `${at}'s premises`, count);
      readIndex(question.conclusion, `${at}'s conclusion`, count);
      return;
    }
    case "true-in":
    case "false-in": {
      const question = readKeys(value, at, ["ask", "structure", "sentence"]);
      readStructure(question.structure, `${at}'s structure`);
      readIndex(question.sentence, `${at}'s sentence`, count);
      return;
    }
    case "weaker":
    case "equivalent": {
      const question = readKeys(value, at, ["ask", "left", "right"]);
      readTheory(question.left, `${at}'s left theory`, count);
      readTheory(question.right, `${at}'s right theory`, count);
      return;
    }
    case "compare":
    case "dualise": {
      const question = readKeys(value, at, ["ask", "theories"]);
      for (const theory of readList(question.theories, `${at}'s theories`))
        readTheory(theory, `a theory of ${at}`, count);
      return;
    }
    default:
      if (!THEORY_QUESTIONS.includes(ask as TheoryQuestion)) reject(`an unknown question, ${show(ask)}`);
      readTheory(readKeys(value, at, ["ask", "axioms"]).axioms, `${at}'s axioms`, count);
  }
}

function readVerdict(value: unknown): void {
  if (value === null || typeof value === "string") return;
  if (!Array.isArray(value) || !value.every((word) => typeof word === "string"))
    reject("the verdict is neither a word nor a list of words");
}

function readFact(value: unknown, at: string, count: number): void {
  const fact = readKeys(value, at, ["fact", "structure", "holds", "fails"]);
  if (fact.fact !== "structure") reject(`${at} is of the unknown kind ${show(fact.fact)}`);
  readStructure(fact.structure, `${at}'s structure`);
  readTheory(fact.holds, `what holds in ${at}`, count);
  if (fact.fails !== null) readTheory(fact.fails, `what fails in ${at}`, count);
}

function readTheory(value: unknown, at: string, count: number): void {
  for (const index of readList(value, at)) readIndex(index, at, count);
}

function readIndex(value: unknown, at: string, count: number): void {
  if (!Number.isInteger(value) || (value as number) < 0 || (value as number) >= count)
    reject(`${at}: ${show(value)} is not the number of a sentence`);
}

function readStructure(value: unknown, at: string): StructureRecord {
  const structure = readKeys(value, at, ["carrier", "tables"]);
  const carrier = readCarrier(structure.carrier, at);
  const tables = structure.tables;
  if (typeof tables !== "object" || tables === null || Array.isArray(tables)) reject(`${at} has no tables`);
  for (const [name, table] of Object.entries(tables)) readTable(table, `${at}, table ${name}`, carrier);
  return value as StructureRecord;
}

function readCarrier(value: unknown, at: string): CarrierDescription {
  const carrier = readKeys(value, `${at}, carrier`, ["kind", "size"]);
  if (carrier.kind !== "points") reject(`${at}: an unknown carrier, ${show(carrier.kind)}`);
  const { size } = carrier;
  if (!Number.isSafeInteger(size) || (size as number) < 1 || (size as number) > LARGEST_DOMAIN)
    reject(`${at}: a domain of ${show(size)} points; from 1 to ${LARGEST_DOMAIN} can be checked`);
  return value as CarrierDescription;
}

function readTable(value: unknown, at: string, carrier: CarrierDescription): TableRecord {
  const table = readKeys(value, at, ["places", "holds"]);
  const { places } = table;
  if (!Number.isInteger(places) || (places as number) < 1)
    reject(`${at}: a relation of ${show(places)} places`);
  const kinds = carrier.size ** (places as number);
  let last = -1;
  for (const kind of readList(table.holds, at)) {
    if (!Number.isInteger(kind) || (kind as number) <= last || (kind as number) >= kinds)
      reject(`${at}: ${show(kind)} is not a kind here, or not in ascending order`);
    last = kind as number;
  }
  return value as TableRecord;
}

function readFormula(value: unknown, at: string, depth: number): Formula {
  if (depth > DEEPEST) reject(`${at} is nested more than ${DEEPEST} levels`);
  if (!Array.isArray(value)) reject(`${at}: ${show(value)} is not a formula`);
  const [head, ...rest] = value as unknown[];
  const inner = (part: unknown) => readFormula(part, at, depth + 1);
  const wants = (count: number) => {
    if (rest.length !== count) reject(`${at}: ${show(head)} with ${rest.length} parts`);
  };
  switch (head) {
    case "true":
    case "false":
      wants(0);
      return head === "true" ? verum : falsum;
    case "is": {
      const [name, ...args] = rest.map((part) => readName(part, at));
      if (name === undefined || args.length === 0) reject(`${at}: an atom without arguments`);
      return { kind: "atom", relation: { name, places: args.length, infix: false }, args };
    }
    case "=":
      wants(2);
      return { kind: "equal", left: readName(rest[0], at), right: readName(rest[1], at) };
    case "not":
      wants(1);
      return { kind: "not", body: inner(rest[0]) };
    case "and":
    case "or":
      if (rest.length < 2) reject(`${at}: ${head} of fewer than two`);
      return { kind: head, parts: rest.map(inner) };
    case "implies":
    case "iff":
      wants(2);
      return { kind: head, left: inner(rest[0]), right: inner(rest[1]) };
    case "forall":
    case "exists":
      wants(2);
      return quantify(head, readName(rest[0], at) as Variable, inner(rest[1]));
    default:
      return reject(`${at}: ${show(head)} does not begin a formula`);
  }
}

function readName(value: unknown, at: string): string {
  if (typeof value !== "string" || value === "") reject(`${at}: ${show(value)} is not a name`);
  return value;
}

function readList(value: unknown, at: string): readonly unknown[] {
  if (!Array.isArray(value)) reject(`${at}: ${show(value)} is not a list`);
  return value;
}

/** The object's values, when it has just these keys. */
function readKeys<Key extends string>(
  value: unknown,
  at: string,
  keys: readonly Key[],
): Record<Key, unknown> {
  if (typeof value !== "object" || value === null || Array.isArray(value)) reject(`${at} is not an object`);
  for (const key of keys) if (!Object.hasOwn(value, key)) reject(`${at} lacks "${key}"`);
  for (const key of Object.keys(value))
    if (!keys.includes(key as Key)) reject(`${at} has the foreign key "${key}"`);
  return value as Record<Key, unknown>;
}

function show(value: unknown): string {
  const text = JSON.stringify(value) ?? String(value);
  return text.length > 40 ? `${text.slice(0, 40)}…` : text;
}
