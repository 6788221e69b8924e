/**
 * Reading evidence: from JSON of unknown origin to typed records, or a refusal that names the place. Nothing that
 * is not in the format passes: no foreign keys, no missing ones, no sentence with free variables.
 */
import { readTerms } from "../carriers/free-terms.ts";
import { atomTerms, type FormulaRecord, partsOf } from "../logic/records/formulas.ts";
import {
  type BooleanAlgebraDescription,
  type CarrierDescription,
  countComponents,
  GENERIC_CLASSES,
  LARGEST_DOMAIN,
  LARGEST_OFFSET,
  MOST_COLOURS,
  MOST_COMPONENTS,
} from "../logic/structure-definition.ts";
import {
  EVIDENCE_FORMAT,
  EVIDENCE_VERSION,
  type Evidence,
  type PrincipleRecord,
  type StructureRecord,
  THEORY_QUESTIONS,
} from "./format.ts";

/** Thrown while reading and checking, caught by the checker: evidence that does not bear out its verdict. */
export class Rejected extends Error {}

export function reject(message: string): never {
  throw new Rejected(message);
}

/** Nesting beyond which evidence is refused, so that no recursion here runs out of stack. */
const DEEPEST = 2_000;
/** Places of relations in structures, and parameters of principles. */
const MOST_PLACES = 100;

/**
 * Refuses what does not have a shape.
 * @param at the place, for people
 * @param sentences how many there are
 */
type Shape = (value: unknown, at: string, sentences: number) => void;
type Shapes = Readonly<Record<string, Shape>>;

/** An object with just these keys. */
const object =
  (shapes: Shapes): Shape =>
  (value, at, sentences) => {
    const members = readObject(value, at);
    for (const key of Object.keys(shapes)) if (!Object.hasOwn(members, key)) reject(`${at} lacks "${key}"`);
    for (const key of Object.keys(members))
      if (!Object.hasOwn(shapes, key)) reject(`${at} has the foreign key "${key}"`);
    for (const [key, shape] of Object.entries(shapes)) shape(members[key], `${at}, ${key}`, sentences);
  };

/** A list that begins with members of these shapes; all others have the last one, or there are none. */
const list =
  (first: readonly Shape[], others?: Shape): Shape =>
  (value, at, sentences) => {
    if (!Array.isArray(value)) return reject(`${at}: ${show(value)} is not a list`);
    if (value.length < first.length || (others === undefined && value.length > first.length))
      reject(`${at}: ${show(value)} has ${value.length} parts`);
    for (const [place, member] of value.entries())
      (first[place] ?? others!)(member, `${at} ${place}`, sentences);
  };
const listOf = (member: Shape) => list([], member);

/** An object or a list whose member under a key, a word, says which of the shapes it has. */
const oneOf =
  (key: string, shapes: Shapes): Shape =>
  (value, at, sentences) => {
    const word =
      typeof value === "object" && value !== null ? (value as Record<string, unknown>)[key] : value;
    if (typeof word !== "string" || typeof value === "string" || !Object.hasOwn(shapes, word))
      return reject(`${at} is of the unknown kind ${show(word)}`);
    shapes[word]!(value, at, sentences);
  };

const nullOr =
  (shape: Shape): Shape =>
  (value, at, sentences) => {
    if (value !== null) shape(value, at, sentences);
  };

const whole =
  (least: number, most = Number.MAX_SAFE_INTEGER): Shape =>
  (value, at) => {
    if (!Number.isSafeInteger(value) || (value as number) < least || (value as number) > most)
      reject(`${at}: ${show(value)} is not a whole number from ${least} to ${most}`);
  };

const name: Shape = (value, at) => {
  if (typeof value !== "string" || value === "") reject(`${at}: ${show(value)} is not a name`);
};
const any: Shape = () => undefined;
const wordOf =
  (words: readonly string[]): Shape =>
  (value, at) => {
    if (!words.includes(value as string)) reject(`${at}: ${show(value)} is none of ${words.join(", ")}`);
  };
const number = whole(0);
const sentence: Shape = (value, at, sentences) => whole(0, sentences - 1)(value, at, sentences);
const theory = listOf(sentence);

const term: Shape = (value, at, sentences) =>
  (Array.isArray(value) ? list([name], term) : name)(value, at, sentences);

function formulaOf(is: Shape, same: Shape): Shape {
  const formula: Shape = (value, at, sentences) => shape(value, at, sentences);
  const [none, two] = [list([name]), list([name, formula, formula])];
  const [several, quantified] = [list([name, formula, formula], formula), list([name, name, formula])];
  const parts = { and: several, or: several, implies: two, iff: two, forall: quantified, exists: quantified };
  const shape = oneOf("0", { is, "=": same, true: none, false: none, not: list([name, formula]), ...parts });
  return formula;
}
/** In a sentence, terms are variables, and atoms have some. */
const plain = formulaOf(list([name, name, name], name), list([name, name, name]));
const closed: Shape = (value, at, sentences) => {
  plain(value, at, sentences);
  requireBound(value as FormulaRecord, new Set(), at);
};

/**
 * Refuses other free variables than some: from the outside, before anything collects the variables of each part.
 * @param allowed is as before afterwards
 */
function requireBound(formula: FormulaRecord, allowed: Set<string>, at: string): void {
  if (formula[0] === "is" || formula[0] === "=") {
    for (const variable of atomTerms(formula))
      if (!allowed.has(variable as string)) reject(`${at} has the free variable ${variable}`);
    return;
  }
  const binds = (formula[0] === "forall" || formula[0] === "exists") && !allowed.has(formula[1]);
  if (binds) allowed.add(formula[1]);
  for (const part of partsOf(formula)) requireBound(part, allowed, at);
  if (binds) allowed.delete(formula[1]);
}
const atoms = { is: list([name, name], term), "=": list([name, term, term]) };
const formula = formulaOf(atoms.is, atoms["="]);
const clause = listOf(oneOf("0", { ...atoms, not: list([name, oneOf("0", atoms)]) }));

const flag: Shape = (value, at) => {
  if (typeof value !== "boolean") reject(`${at}: ${show(value)} is neither true nor false`);
};
const offset = whole(0, LARGEST_OFFSET);
const component: Shape = (value, at, sentences) => components(value, at, sentences);
const components = oneOf("kind", {
  points: object({ kind: name, size: whole(1, LARGEST_DOMAIN) }),
  "dense-line": object({ kind: name, colours: whole(1, MOST_COLOURS) }),
  "integer-line": object({ kind: name, offset }),
  "half-line": object({ kind: name, offset, ends: offset }),
  tuples: object({
    kind: name,
    over: component,
    widths: list([whole(0, MOST_COMPONENTS)], whole(0, MOST_COMPONENTS)),
  }),
  sum: object({ kind: name, parts: list([component, component], component) }),
  product: object({ kind: name, outer: component, inner: component }),
  generic: object({ kind: name, of: wordOf(GENERIC_CLASSES) }),
  "boolean-algebra": (value, at, sentences) => {
    object({ kind: name, zero: flag, top: flag })(value, at, sentences);
    const { zero, top } = value as BooleanAlgebraDescription;
    if (zero && !top) reject(`${at}: there is no Boolean algebra with its zero and without its top`);
  },
  "dense-tree": object({ kind: name }),
  forest: object({ kind: name, branching: whole(1, MOST_COMPONENTS), rooted: flag, offset, ends: offset }),
});
const carrier: Shape = (value, at, sentences) => {
  component(value, at, sentences);
  const count = countComponents(value as CarrierDescription);
  if (count > MOST_COMPONENTS) reject(`${at} has ${count} components, more than ${MOST_COMPONENTS}`);
};

const structure: Shape = (value, at, sentences) => {
  object({ carrier, tables: readObject })(value, at, sentences);
  const record = value as StructureRecord;
  for (const [relation, table] of Object.entries(record.tables)) {
    const where = `${at}, table ${relation}`;
    object({ places: whole(1, MOST_PLACES), holds: listOf(number) })(table, where, sentences);
    if (table.holds.some((kind, place) => kind <= (table.holds[place - 1] ?? -1)))
      reject(`${where}: kinds are not in ascending order`);
  }
};

/** Certificates are looked at when the fact is checked: what they may be depends on the terms. */
const terms: Shape = (value, at) => {
  if (readTerms(value) === null) reject(`${at} does not define a structure of free terms`);
};
const substitution: Shape = (value, at, sentences) =>
  listOf(term)(Object.values(readObject(value, at)), at, sentences);
const made = oneOf("0", {
  define: list([name, name, listOf(name), formula]),
  unfold: list([name, number, number]),
  fold: list([name, number, number, formula]),
  miniscope: list([name, number]),
});
const line = oneOf("0", {
  clause: list([name, number, number]),
  identity: list([name, clause]),
  infer: list([name, clause, listOf(list([number, substitution]))]),
});
const derivation = {
  premises: theory,
  conclusion: nullOr(sentence),
  made: listOf(made),
  lines: listOf(line),
};
const parameters: Shape = (value, at, sentences) => {
  listOf(name)(value, at, sentences);
  if ((value as unknown[]).length > MOST_PLACES) reject(`${at}: more than ${MOST_PLACES} parameters`);
};
const withoutTerms = { parameters, given: nullOr(plain), domain: plain, relation: plain };
const different: Shape = (value, at, sentences) =>
  (value === "identity" ? any : listOf(list([name, whole(1)])))(value, at, sentences);
const principles = oneOf("principle", {
  "endless-order": object({ principle: name, ...withoutTerms, everywhere: flag }),
  counting: object({
    ...{
      principle: name,
      ...withoutTerms,
      different,
      successors: number,
      predecessors: number,
      everywhere: flag,
    },
    spare: nullOr(wordOf(["fewer-predecessors", "more-successors"])),
  }),
  pairs: object({ principle: name, ...withoutTerms, different, pairs: number }),
  comprehension: object({ principle: name, ...withoutTerms, different }),
});
const principle: Shape = (value, at, sentences) => {
  principles(value, at, sentences);
  const { parameters: own, given, domain, relation } = value as PrincipleRecord;
  requireBound(given ?? ["true"], new Set(own), `${at}, given`);
  requireBound(domain, new Set([...own, "x"]), `${at}, domain`);
  requireBound(relation, new Set([...own, "x", "y", "z"]), `${at}, relation`);
};
const proof = listOf(listOf(whole(-Number.MAX_SAFE_INTEGER)));
const fact = oneOf("fact", {
  structure: object({ fact: name, structure, holds: theory, fails: nullOr(theory) }),
  terms: object({ fact: name, terms, holds: theory, fails: nullOr(theory), certificates: listOf(any) }),
  derivation: object({ fact: name, ...derivation }),
  "no-finite-model": object({ fact: name, axioms: theory, principle }),
  "no-model": object({ fact: name, axioms: theory, size: whole(1, LARGEST_DOMAIN), proof }),
});

const entailment = object({ ask: name, premises: theory, conclusion: sentence });
const truth = object({ ask: name, structure, sentence });
const pair = object({ ask: name, left: theory, right: theory });
const several = object({ ask: name, theories: listOf(theory) });
const single = object({ ask: name, axioms: theory });
const question = oneOf("ask", {
  ...{ entails: entailment, "does-not-entail": entailment, "true-in": truth, "false-in": truth },
  ...{ weaker: pair, equivalent: pair, compare: several, dualise: several },
  ...Object.fromEntries(THEORY_QUESTIONS.map((ask) => [ask, single])),
});
const verdict: Shape = (value, at, sentences) => {
  if (value !== null && typeof value !== "string") listOf(word)(value, at, sentences);
};
const word: Shape = (value, at) => {
  if (typeof value !== "string") reject(`${at}: ${show(value)} is not a word`);
};

/** @throws Rejected */
export function readEvidence(value: unknown): Evidence {
  const { format, version, sentences } = readObject(value, "evidence");
  if (format !== EVIDENCE_FORMAT) reject("this is not Twoplace evidence");
  if (version !== EVIDENCE_VERSION)
    reject(`evidence of version ${show(version)}; this checker reads version ${EVIDENCE_VERSION}`);
  requireShallow(value);
  const parts = { sentences: listOf(closed), question, digest: word, verdict, facts: listOf(fact) };
  const count = Array.isArray(sentences) ? sentences.length : 0;
  object({ format: any, version: any, ...parts })(value, "evidence", count);
  return value as Evidence;
}

function requireShallow(value: unknown): void {
  let level = [value];
  for (let depth = 0; level.length > 0; depth += 1) {
    if (depth > DEEPEST) reject(`something is nested more than ${DEEPEST} levels`);
    level = level.flatMap((part) => (typeof part === "object" && part !== null ? Object.values(part) : []));
  }
}

function readObject(value: unknown, at: string): Record<string, unknown> {
  if (typeof value !== "object" || value === null || Array.isArray(value)) reject(`${at} is not an object`);
  return value as Record<string, unknown>;
}

function show(value: unknown): string {
  const text = JSON.stringify(value) ?? String(value);
  return text.length > 40 ? `${text.slice(0, 40)}…` : text;
}
