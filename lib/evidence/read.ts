/**
 * Reading evidence: from JSON of unknown origin to typed records, or a refusal that names the place. Nothing that
 * is not in the format passes: no foreign keys, no missing ones, no sentence with free variables.
 */

import { freeVariables } from "../logic/formula-records.ts";
import { LARGEST_DOMAIN } from "../logic/structure-definition.ts";
import {
  EVIDENCE_FORMAT,
  EVIDENCE_VERSION,
  type Evidence,
  type TermFormulaRecord,
  THEORY_QUESTIONS,
} from "./format.ts";

/** Thrown while reading and checking, caught by the checker: evidence that does not bear out its verdict. */
export class Rejected extends Error {}

export function reject(message: string): never {
  throw new Rejected(message);
}

/** Nesting of formulas and terms beyond which evidence is refused, so that no recursion here runs out of stack. */
const DEEPEST = 2_000;

/**
 * Refuses what does not have a shape.
 * @param at the place, for people
 * @param sentences how many there are
 */
type Shape = (value: unknown, at: string, sentences: number) => void;

const listOf =
  (member: Shape): Shape =>
  (value, at, sentences) => {
    for (const [place, one] of readList(value, at).entries()) member(one, `${at} ${place}`, sentences);
  };

const tuple =
  (...members: readonly Shape[]): Shape =>
  (value, at, sentences) => {
    const parts = readList(value, at);
    if (parts.length !== members.length) reject(`${at}: ${show(value)} has not ${members.length} parts`);
    for (const [place, member] of members.entries()) member(parts[place], at, sentences);
  };

/** An object with just these keys. */
const object =
  (shapes: Readonly<Record<string, Shape>>): Shape =>
  (value, at, sentences) => {
    const members = readObject(value, at);
    for (const key of Object.keys(shapes)) if (!Object.hasOwn(members, key)) reject(`${at} lacks "${key}"`);
    for (const key of Object.keys(members))
      if (!Object.hasOwn(shapes, key)) reject(`${at} has the foreign key "${key}"`);
    for (const [key, shape] of Object.entries(shapes)) shape(members[key], `${at}, ${key}`, sentences);
  };

/** An object or a list whose member under a key, a word, says which of the shapes it has. */
const oneOf =
  (key: string, shapes: Readonly<Record<string, Shape>>): Shape =>
  (value, at, sentences) => {
    const word =
      typeof value === "object" && value !== null ? (value as Record<string, unknown>)[key] : value;
    if (typeof word !== "string" || !Object.hasOwn(shapes, word))
      return reject(`${at} is of the unknown kind ${show(word)}`);
    return shapes[word]!(value, at, sentences);
  };

const nullOr =
  (shape: Shape): Shape =>
  (value, at, sentences) => {
    if (value !== null) shape(value, at, sentences);
  };

const wholeFrom =
  (least: number, most = Number.MAX_SAFE_INTEGER): Shape =>
  (value, at) => {
    if (!Number.isSafeInteger(value) || (value as number) < least || (value as number) > most)
      reject(`${at}: ${show(value)} is not a whole number from ${least} to ${most}`);
  };

const any: Shape = () => undefined;
const name: Shape = (value, at) => {
  if (typeof value !== "string" || value === "") reject(`${at}: ${show(value)} is not a name`);
};
const number = wholeFrom(0);
const sentence: Shape = (value, at, sentences) => wholeFrom(0, sentences - 1)(value, at, sentences);
const theory = listOf(sentence);

const structure: Shape = (value, at, sentences) => {
  object({ carrier, tables: any })(value, at, sentences);
  const { carrier: description, tables } = value as { carrier: { size: number }; tables: unknown };
  for (const [relation, record] of Object.entries(readObject(tables, `${at}, tables`))) {
    const where = `${at}, table ${relation}`;
    object({ places: wholeFrom(1), holds: listOf(number) })(record, where, sentences);
    const { places, holds } = record as { places: number; holds: readonly number[] };
    for (const [place, kind] of holds.entries())
      if (kind <= (holds[place - 1] ?? -1) || kind >= description.size ** places)
        reject(`${where}: ${kind} is not a kind here, or not in ascending order`);
  }
};
const carrier = oneOf("kind", { points: object({ kind: name, size: wholeFrom(1, LARGEST_DOMAIN) }) });

const formula: Shape = (value, at) => readFormula(value, at, 0, false);
const term: Shape = (value, at) => readTerm(value, at, 0, false);
const clause = listOf((value, at) => {
  const [head, ...rest] = readList(value, at);
  const atom = head === "not" && rest.length === 1 ? readList(rest[0], at) : [head];
  if (atom[0] !== "is" && atom[0] !== "=") reject(`${at}: ${show(value)} is not a literal`);
  readFormula(value, at, 0, false);
});
const use = tuple(number, (value, at, sentences) => {
  for (const one of Object.values(readObject(value, at))) term(one, at, sentences);
});
const made = oneOf("0", {
  define: tuple(name, name, listOf(name), formula),
  unfold: tuple(name, number, number),
  fold: tuple(name, number, number, formula),
  miniscope: tuple(name, number),
});
const line = oneOf("0", {
  clause: tuple(name, number, number),
  identity: tuple(name, clause),
  infer: tuple(name, clause, listOf(use)),
});

const fact = oneOf("fact", {
  structure: object({ fact: name, structure, holds: theory, fails: nullOr(theory) }),
  derivation: object({
    fact: name,
    premises: theory,
    conclusion: nullOr(sentence),
    made: listOf(made),
    lines: listOf(line),
  }),
  "no-model": object({
    fact: name,
    axioms: theory,
    size: wholeFrom(1, LARGEST_DOMAIN),
    proof: listOf(listOf(wholeFrom(-Number.MAX_SAFE_INTEGER))),
  }),
});

const entailment = object({ ask: name, premises: theory, conclusion: sentence });
const truth = object({ ask: name, structure, sentence });
const pair = object({ ask: name, left: theory, right: theory });
const several = object({ ask: name, theories: listOf(theory) });
const single = object({ ask: name, axioms: theory });
const question = oneOf("ask", {
  entails: entailment,
  "does-not-entail": entailment,
  "true-in": truth,
  "false-in": truth,
  weaker: pair,
  equivalent: pair,
  compare: several,
  dualise: several,
  ...Object.fromEntries(THEORY_QUESTIONS.map((ask) => [ask, single])),
});

/** @throws Rejected */
export function readEvidence(value: unknown): Evidence {
  const evidence = readObject(value, "evidence");
  if (evidence.format !== EVIDENCE_FORMAT) reject("this is not Twoplace evidence");
  if (evidence.version !== EVIDENCE_VERSION)
    reject(`evidence of version ${show(evidence.version)}; this checker reads version ${EVIDENCE_VERSION}`);
  const sentences = Array.isArray(evidence.sentences) ? evidence.sentences.length : 0;
  object({
    format: name,
    version: number,
    sentences: listOf(readSentence),
    question,
    digest: name,
    verdict: any,
    facts: listOf(fact),
  })(value, "evidence", sentences);
  const { verdict } = evidence;
  const isWord = (one: unknown) => typeof one === "string";
  if (verdict !== null && !isWord(verdict) && !(Array.isArray(verdict) && verdict.every(isWord)))
    reject("the verdict is neither a word nor a list of words");
  return value as Evidence;
}

function readSentence(value: unknown, at: string): void {
  readFormula(value, at, 0, true);
  const free = freeVariables(value as TermFormulaRecord);
  if (free.length > 0) reject(`${at}: ${show(value)} has the free variable ${free[0]}`);
}

/** @param isPlain whether terms are variables and atoms have arguments, as in sentences */
function readFormula(value: unknown, at: string, depth: number, isPlain: boolean): void {
  if (depth > DEEPEST) reject(`${at}: a formula is nested more than ${DEEPEST} levels`);
  const [head, ...rest] = readList(value, at);
  const wants = (least: number, most = least) => {
    if (rest.length < least || rest.length > most) reject(`${at}: ${show(head)} with ${rest.length} parts`);
  };
  switch (head) {
    case "true":
    case "false":
      wants(0);
      return;
    case "is":
      wants(isPlain ? 2 : 1, Number.POSITIVE_INFINITY);
      name(rest.shift(), at, 0);
      for (const part of rest) readTerm(part, at, depth + 1, isPlain);
      return;
    case "=":
      wants(2);
      for (const part of rest) readTerm(part, at, depth + 1, isPlain);
      return;
    case "forall":
    case "exists":
      wants(2);
      name(rest.shift(), at, 0);
      break;
    case "not":
      wants(1);
      break;
    case "and":
    case "or":
      wants(2, Number.POSITIVE_INFINITY);
      break;
    case "implies":
    case "iff":
      wants(2);
      break;
    default:
      reject(`${at}: ${show(head)} does not begin a formula`);
  }
  for (const part of rest) readFormula(part, at, depth + 1, isPlain);
}

function readTerm(value: unknown, at: string, depth: number, isPlain: boolean): void {
  if (depth > DEEPEST) reject(`${at}: a term is nested more than ${DEEPEST} levels`);
  const [head, ...args] = isPlain || !Array.isArray(value) ? [value] : value;
  name(head, at, 0);
  for (const arg of args) readTerm(arg, at, depth + 1, isPlain);
}

function readList(value: unknown, at: string): unknown[] {
  if (!Array.isArray(value)) reject(`${at}: ${show(value)} is not a list`);
  return value;
}

function readObject(value: unknown, at: string): Record<string, unknown> {
  if (typeof value !== "object" || value === null || Array.isArray(value)) reject(`${at} is not an object`);
  return value as Record<string, unknown>;
}

function show(value: unknown): string {
  const text = JSON.stringify(value) ?? String(value);
  return text.length > 40 ? `${text.slice(0, 40)}…` : text;
}
