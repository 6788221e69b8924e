/**
 * What a stored result says in its verdict and data, held against its evidence. Only what evidence can bear out is
 * looked at; sizes and counts that a complete search has settled without evidence are remarked on.
 */

import { buildCarrier } from "../../lib/carriers/build.ts";
import type { Evidence, Fact, StructureRecord, TheoryRecord } from "../../lib/evidence/format.ts";
import { dualsOf } from "../../lib/inquiry/dualise.ts";
import type { Statement } from "../../lib/language/statements.ts";
import { type RelationSymbol, relationsOf } from "../../lib/logic/formula.ts";
import { recordFormula } from "../../lib/logic/records/formulas.ts";
import type { Theory } from "../../lib/logic/theory.ts";
import { claimOf } from "../display/summaries.ts";
import { findOtherFindings } from "./recheck-findings.ts";
import { findOtherInfinite } from "./recheck-infinite.ts";

/** The parts of a stored result that say what was found. */
export interface Stored {
  readonly verdict: string | null;
  readonly data: Readonly<Record<string, unknown>>;
}

type Words = readonly string[];
/** Statements with one verdict. */
type Asking = Statement & { kind: "derive" | "claim" | "conjecture" | "check-finite" };

/** Why the stored words are not those of the evidence, or null. */
export function findDisagreement(
  statement: Statement,
  stored: Stored,
  evidence: Evidence | null,
): string | null {
  if (evidence === null) return findUnsupported(statement, stored);
  switch (statement.kind) {
    case "derive":
    case "claim":
    case "conjecture":
    case "check-finite":
      return (
        findOtherVerdict(stored.verdict, evidence.verdict) ??
        findOtherClaim(statement, stored.data) ??
        findInconsistency(stored, evidence) ??
        findOtherSizes(stored, evidence) ??
        findOtherInfinite(stored.data, evidence, relationsAsked(statement)) ??
        findUnused(statement, stored, evidence) ??
        findOtherAxioms(statement, stored, evidence)
      );
    case "independence":
    case "compare":
    case "dualise":
    case "minimise":
      return findOtherWords(statement, stored, evidence.verdict) ?? findPairs(statement, stored, evidence);
    case "models":
      return findOtherModels(stored.data.models, statement.size, evidence);
    case "count":
      return findForeignSize(statement.options.upTo ?? 0, evidence);
    case "describe":
      return findOtherProperties(statement, stored.data.properties, evidence);
    default:
      return "the statement has no evidence of its own";
  }
}

/** Without evidence everything must be open, computed or of no consequence. */
function findUnsupported(statement: Statement, stored: Stored): string | null {
  const bare = (what: string) => `${what} is stored without evidence`;
  switch (statement.kind) {
    case "derive":
    case "claim":
    case "conjecture":
    case "check-finite":
      return stored.verdict === "open" ? null : bare(`the verdict ${quoted(stored.verdict)}`);
    case "independence":
    case "compare":
    case "dualise": {
      const words = wordsOf(statement, stored);
      const settled = words?.find((word) => word !== "open");
      if (words === null) return DAMAGED;
      return settled === undefined
        ? findOtherWords(
            statement,
            stored,
            words.map(() => "open"),
          )
        : bare(`the verdict ${quoted(settled)}`);
    }
    case "minimise":
      return JSON.stringify(stored.data.sets) === "[]" ? null : bare("a set of axioms");
    case "models":
      return JSON.stringify(stored.data.models) === "[]" ? null : bare("a model");
    default:
      return stored.verdict === null ? null : bare(`the verdict ${quoted(stored.verdict)}`);
  }
}

const DAMAGED = "the stored data do not have the form that they were written in";

function quoted(value: unknown): string {
  return typeof value === "string" ? `\`${value}\`` : String(value);
}

function findOtherVerdict(stored: string | null, shown: Evidence["verdict"]): string | null {
  if (stored === shown) return null;
  return `the stored verdict is ${quoted(stored)}, and the evidence is for ${quoted(shown)}`;
}

/** The data name the claim that they are about. */
function findOtherClaim(statement: Asking, { claim }: Stored["data"]): string | null {
  const own = claimOf(statement)?.kind;
  return claim === own ? null : `the stored data are about ${quoted(claim)}, and the claim is ${quoted(own)}`;
}

/** The words of a result with several verdicts, in the order of the evidence; null when the data are damaged. */
function wordsOf(statement: Statement, { data }: Stored): Words | null {
  switch (statement.kind) {
    case "independence": {
      const axioms = data.axioms as Record<string, string> | undefined;
      const labels = statement.theory.theory.axioms.map(({ label }) => label);
      if (typeof axioms !== "object" || axioms === null || Object.keys(axioms).length !== labels.length)
        return null;
      return labels.map((label) => String(axioms[label]));
    }
    case "compare":
    case "dualise": {
      const names =
        statement.kind === "compare"
          ? statement.theories.map(({ text }) => text)
          : dualsOf(statement.theory.text, statement.theory.theory).map(({ name }) => name);
      const pairs = pairsIn(data);
      const expected = pairsOf(names);
      if (pairs?.length !== expected.length) return null;
      const isOwn = pairs.every(
        ({ left, right }, place) => left === expected[place]![0] && right === expected[place]![1],
      );
      return isOwn ? pairs.map(({ verdict }) => String(verdict)) : null;
    }
    case "minimise": {
      const labels = statement.theory.theory.axioms.map(({ label }) => label);
      if (!Array.isArray(data.sets)) return null;
      const sets = data.sets.map((set: unknown) =>
        Array.isArray(set) ? set.map((label) => labels.indexOf(label as string)).join(",") : "",
      );
      return data.complete === true ? ["complete", ...sets] : sets;
    }
    default:
      return null;
  }
}

interface StoredPair {
  readonly left?: unknown;
  readonly right?: unknown;
  readonly verdict?: unknown;
  readonly jointlyInconsistent?: unknown;
}

function pairsIn({ pairs }: Stored["data"]): readonly StoredPair[] | null {
  return isListOfObjects(pairs) ? pairs : null;
}

function isListOfObjects(value: unknown): value is readonly object[] {
  return Array.isArray(value) && value.every((part) => typeof part === "object" && part !== null);
}

/** All pairs of different places, in order. */
function pairsOf<Thing>(things: readonly Thing[]): readonly (readonly [Thing, Thing])[] {
  return things.flatMap((left, place) =>
    things.slice(place + 1).map((right): readonly [Thing, Thing] => [left, right]),
  );
}

function findOtherWords(statement: Statement, stored: Stored, shown: Evidence["verdict"]): string | null {
  const words = wordsOf(statement, stored);
  if (words === null || !Array.isArray(shown)) return DAMAGED;
  const [only] = words;
  const single = statement.kind === "compare" && words.length === 1 ? (only ?? null) : null;
  if (stored.verdict !== single)
    return `the stored verdict is ${quoted(stored.verdict)}, and the stored data say ${quoted(single)}`;
  if (words.length !== shown.length)
    return `the stored data have ${words.length} verdicts, and the evidence has ${shown.length}`;
  const place = words.findIndex((word, index) => word !== shown[index]);
  if (place === -1) return null;
  return `the stored data say ${quoted(words[place])}, and the evidence is for ${quoted(shown[place])}`;
}

/** What `compare` says besides the verdicts: common models, and theories without a model. */
function findPairs(statement: Statement, stored: Stored, { question, facts }: Evidence): string | null {
  if (statement.kind !== "compare" || question.ask !== "compare") return null;
  const { theories } = question;
  for (const [place, [left, right]] of pairsOf(theories).entries()) {
    const both = [...left, ...right];
    const said = pairsIn(stored.data)?.[place]?.jointlyInconsistent;
    if (said === true && !contradicts(facts, both))
      return "a pair is said to be jointly inconsistent, and no derivation shows that";
    const isCommon = (fact: Fact) =>
      (fact.fact === "structure" || fact.fact === "terms") && contains(fact.holds, both);
    if (said === false && !facts.some(isCommon))
      return "a pair is said to have a common model, and no structure shows that";
  }
  const { inconsistent } = stored.data;
  const names = statement.theories.map(({ text }) => text);
  if (!Array.isArray(inconsistent)) return DAMAGED;
  const unshown = inconsistent.find(
    (name) => !contradicts(facts, theories[names.indexOf(name as string)] ?? []),
  );
  return unshown === undefined
    ? null
    : `${quoted(unshown)} is said to have no model, and no derivation shows that`;
}

/** Whether a derivation of a contradiction starts from nothing but these sentences. */
function contradicts(facts: readonly Fact[], theory: TheoryRecord): boolean {
  return facts.some(
    (fact) => fact.fact === "derivation" && fact.conclusion === null && contains(theory, fact.premises),
  );
}

function contains(larger: TheoryRecord, smaller: TheoryRecord): boolean {
  return smaller.every((index) => larger.includes(index));
}

function findInconsistency({ data }: Stored, { facts }: Evidence): string | null {
  if (data.inconsistent !== true) return null;
  const isShown = facts.some((fact) => fact.fact === "derivation" && fact.conclusion === null);
  return isShown ? null : "the premises are said to be inconsistent, and no derivation shows that";
}

/** Axioms that are said to be used in derivations must be. */
function findUnused(statement: Asking, { data }: Stored, { sentences, facts }: Evidence): string | null {
  const { used } = data;
  if (used === undefined) return null;
  if (!Array.isArray(used)) return DAMAGED;
  const premises = new Set(
    facts.flatMap((fact) =>
      fact.fact === "derivation" ? fact.premises.map((index) => JSON.stringify(sentences[index])) : [],
    ),
  );
  const axioms = theoriesOf(statement).flatMap(({ axioms: own }) => own);
  const isUsed = (label: unknown) =>
    axioms.some(
      (axiom) => axiom.label === label && premises.has(JSON.stringify(recordFormula(axiom.formula))),
    );
  const unused = used.find((label) => !isUsed(label));
  return unused === undefined ? null : `${quoted(unused)} is said to be used, and no derivation uses it`;
}

function relationsAsked(statement: Asking): readonly RelationSymbol[] {
  const axioms = theoriesOf(statement).flatMap(({ axioms: own }) => own.map(({ formula }) => formula));
  const conclusion =
    statement.kind === "derive"
      ? [statement.conclusion.formula]
      : statement.kind !== "check-finite" && "conclusion" in statement.claim
        ? [statement.claim.conclusion.formula]
        : [];
  return [...axioms, ...conclusion].flatMap(relationsOf);
}

function theoriesOf(statement: Asking): readonly Theory[] {
  if (statement.kind === "derive") return [statement.premises.theory];
  if (statement.kind === "check-finite") return [statement.theory.theory];
  const { claim } = statement;
  if ("premises" in claim) return [claim.premises.theory];
  if ("left" in claim) return [claim.left.theory, claim.right.theory];
  return "theory" in claim ? [claim.theory.theory] : [];
}

/** What the claim that a theory is independent says of each axiom. */
function findOtherAxioms(statement: Asking, { data }: Stored, { question, facts }: Evidence): string | null {
  if (question.ask !== "independent") return null;
  const words = data.axioms as Readonly<Record<string, unknown>> | undefined;
  if (typeof words !== "object" || words === null) return DAMAGED;
  const [theory] = theoriesOf(statement);
  const unshown = theory?.axioms.find(({ label }, place) => {
    const others = question.axioms.filter((_, other) => other !== place);
    return (
      words[label] !== "open" &&
      !facts.some((fact) => settles(fact, words[label], question.axioms[place]!, others))
    );
  });
  return unshown === undefined
    ? null
    : `the evidence does not show that ${unshown.label} is ${quoted(words[unshown.label])}`;
}

/** Whether a fact shows that an axiom is what a word says, beside the others. */
function settles(fact: Fact, word: unknown, axiom: number, others: TheoryRecord): boolean {
  switch (fact.fact) {
    case "structure":
    case "terms":
      return word === "independent" && contains(fact.holds, others) && fact.fails?.includes(axiom) === true;
    case "derivation":
      return (
        word === "redundant" &&
        contains(others, fact.premises) &&
        (fact.conclusion === null || fact.conclusion === axiom)
      );
    case "no-model":
    case "no-finite-model":
      return false;
  }
}

/** Keys of data that give the size of a structure in the evidence, null for an infinite one, and up to where none was found. */
const SIZES = [
  ["modelSize", "noModelUpTo"],
  ["countermodelSize", "noCountermodelUpTo"],
  ["separatingSize", "noneUpTo"],
] as const;

function findOtherSizes({ data }: Stored, { facts }: Evidence): string | null {
  const structures = structuresIn(facts);
  for (const [key, none] of SIZES) {
    if (data[key] === undefined && data[none] === undefined) continue;
    const [size, noneUpTo] = [data[key], data[none]];
    if ((size !== null && !isCount(size)) || !isCount(noneUpTo)) return DAMAGED;
    if (size !== null && !structures.some((structure) => pointsOf(structure) === size))
      return `a structure on ${size} points is stored, and the evidence has none of that size`;
    if (size !== null && noneUpTo >= size)
      return `there is said to be none up to ${noneUpTo} points, and one on ${size} points is stored`;
  }
  return findOtherLeast(data, facts);
}

function isCount(value: unknown): value is number {
  return Number.isSafeInteger(value) && (value as number) >= 0;
}

/** What `check-finite` says of the least size, and of the sizes that are proven to have no model. */
function findOtherLeast(data: Stored["data"], facts: readonly Fact[]): string | null {
  const { leastSize = null, modelSize = null, noModelUpTo, provenUpTo = 0 } = data;
  if (!isCount(provenUpTo)) return DAMAGED;
  if (leastSize !== null && (leastSize !== modelSize || noModelUpTo !== (modelSize as number) - 1))
    return `${String(leastSize)} is said to be the least size, and that is not what the other sizes say`;
  const proven = facts.flatMap((fact) => (fact.fact === "no-model" ? [fact.size] : []));
  for (let size = 1; size <= provenUpTo; size += 1)
    if (!proven.includes(size))
      return `that no model has ${size} points is said to be proven, and no proof is there`;
  return null;
}

function structuresIn(facts: readonly Fact[]): readonly StructureRecord[] {
  return facts.flatMap((fact) => (fact.fact === "structure" ? [fact.structure] : []));
}

/** How many elements; null when there are infinitely many. */
function pointsOf({ carrier }: StructureRecord): number | null {
  return buildCarrier(carrier).size;
}

function sizeText(structure: StructureRecord): string {
  const size = pointsOf(structure);
  return size === null ? "infinitely many" : String(size);
}

function findOtherModels(models: unknown, size: number, { facts }: Evidence): string | null {
  const structures = structuresIn(facts);
  if (!isListOfObjects(models)) return DAMAGED;
  if (models.length !== structures.length)
    return `${models.length} models are stored, and the evidence has ${structures.length}`;
  for (const [place, structure] of structures.entries()) {
    const { carrier, tables } = structure;
    if (carrier.kind !== "points" || carrier.size !== size)
      return `the evidence has a model on ${sizeText(structure)} points, where ${size} were asked for`;
    const relations = models[place] as Readonly<Record<string, unknown>>;
    const isSame =
      Object.keys(relations).length === Object.keys(tables).length &&
      Object.entries(tables).every(
        ([name, { places, holds }]) =>
          JSON.stringify(relations[name]) ===
          JSON.stringify(holds.map((kind) => tupleOf(kind, places, carrier.size))),
      );
    if (!isSame) return `model ${place + 1} is not the one in the evidence`;
  }
  return null;
}

/** The tuple of points, counted from 1, that has a kind; as the format of evidence numbers them. */
function tupleOf(kind: number, places: number, size: number): readonly number[] {
  const tuple: number[] = [];
  for (let rest = kind, place = 0; place < places; place += 1, rest = Math.floor(rest / size))
    tuple.unshift((rest % size) + 1);
  return tuple;
}

function findForeignSize(upTo: number, { facts }: Evidence): string | null {
  const larger = structuresIn(facts).find(
    (structure) => (pointsOf(structure) ?? Number.POSITIVE_INFINITY) > upTo,
  );
  return larger === undefined
    ? null
    : `the evidence has a model on ${sizeText(larger)} points, where up to ${upTo} were asked for`;
}

function findOtherProperties(
  statement: Statement & { kind: "describe" },
  properties: unknown,
  evidence: Evidence,
): string | null {
  if (statement.subject.kind !== "theory" || !isListOfObjects(properties)) return DAMAGED;
  return findOtherFindings(statement.subject.theory.theory, properties, evidence, DAMAGED);
}
