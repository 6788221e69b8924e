/** Evidence of every kind that infinite structures and reasons come into, as the searches make it, and changes of it. */
import { buildCarrier } from "../../lib/carriers/build.ts";
import { checkEvidence } from "../../lib/evidence/check.ts";
import { digestOf } from "../../lib/evidence/digest.ts";
import type { Evidence, Fact, StructureRecord, VerdictRecord } from "../../lib/evidence/format.ts";
import { checkFinite } from "../../lib/inquiry/check-finite.ts";
import {
  askConsistent,
  askDoesNotEntail,
  askEntails,
  askEquivalent,
  askIndependent,
  askInfiniteOnly,
  askNoFiniteModel,
  askTruth,
  askWeaker,
} from "../../lib/inquiry/claims.ts";
import { compareTheories } from "../../lib/inquiry/compare.ts";
import { askDuals } from "../../lib/inquiry/dualise.ts";
import { askIndependence } from "../../lib/inquiry/independence.ts";
import { minimise } from "../../lib/inquiry/minimise.ts";
import { unwatchedWork } from "../../lib/inquiry/work.ts";
import type { CarrierDescription } from "../../lib/logic/structure-definition.ts";
import type { Theory } from "../../lib/logic/theory.ts";
import { changes } from "./changes.ts";
import {
  type ClaimEntry,
  claims,
  infiniteOnly,
  type QuestionEntry,
  questions,
  readSentences,
  readTheory,
  theoryOf,
} from "./corpora.ts";
import { isRight } from "./evidence-judge.ts";

/** A theory with only infinite models, by its number in `infinite-only.json`. */
export function infiniteTheory(id: string): Theory {
  return readTheory(infiniteOnly.find((entry) => entry.id === id)!.axioms);
}

/** `check-finite` of such a theory: `infinite-only`. */
export function finitenessEvidence(id: string): Evidence {
  return expectEvidence(checkFinite(infiniteTheory(id), unwatchedWork).evidence);
}

/** Questions of the corpora with only infinite countermodels. */
export const infiniteQuestions: readonly (ClaimEntry | QuestionEntry)[] = [...questions, ...claims].filter(
  ({ expected }) => expected === "only infinite countermodels",
);

/** Null where a search of some length leaves the question open. */
export function countermodelEvidence({ premises, conclusion }: ClaimEntry | QuestionEntry): Evidence | null {
  const sentences = readSentences([...premises, conclusion]);
  const work = { ...unwatchedWork, budget: 40_000 };
  return askEntails(theoryOf(sentences.slice(0, -1)), sentences.at(-1)!, work).evidence;
}

/** The same facts for another verdict, without some of them. */
function asking(
  evidence: Evidence,
  verdict: VerdictRecord,
  isKept: (fact: Fact) => boolean,
  ask: "check-finite" | "infinite-only" | "no-finite-model" | "consistent",
): Evidence {
  const question = { ask, axioms: (evidence.question as { readonly axioms: readonly number[] }).axioms };
  const { sentences, facts } = evidence;
  return {
    ...evidence,
    ...{ question, verdict, facts: facts.filter(isKept) },
    digest: digestOf(sentences, question),
  };
}

const isStructure = ({ fact }: Fact) => fact === "structure" || fact === "terms";

/** Evidence of every question that has room for infinite structures or for reasons, by what it is. */
export function evidenceOfAllQuestions(): Readonly<Record<string, Evidence>> {
  const order = [
    "forall x. ~R(x,x)",
    "forall x y z. R(x,y) & R(y,z) -> R(x,z)",
    "forall x. exists y. R(x,y)",
  ];
  const dense = "forall x y. R(x,y) -> (exists z. R(x,z) & R(z,y))";
  const [endless, denseOrder] = [readTheory(order), readTheory([...order, dense])];
  const asymmetric = readTheory([...order, "forall x y. R(x,y) -> ~R(y,x)"]);
  const total = readSentences(["forall x y. R(x,y) | R(y,x) | x = y"])[0]!;
  const finiteness = finitenessEvidence("io-01");
  const ofTerms = finitenessEvidence("io-47");
  const injection = infiniteTheory("io-27");
  const found: Readonly<Record<string, Evidence | null>> = {
    entails: askEntails(endless, total, unwatchedWork).evidence,
    "does-not-entail": askDoesNotEntail(denseOrder, total, unwatchedWork).evidence,
    "consistent, infinite": askConsistent(denseOrder, unwatchedWork).evidence,
    "consistent, terms": askConsistent(infiniteTheory("io-49"), unwatchedWork).evidence,
    "infinite-only": askInfiniteOnly(endless, unwatchedWork).evidence,
    "no-finite-model": askNoFiniteModel(injection, unwatchedWork).evidence,
    "check-finite, consistent": asking(finiteness, "consistent", isStructure, "check-finite"),
    "check-finite, no-finite-model": asking(
      finiteness,
      "no-finite-model",
      (fact) => !isStructure(fact),
      "check-finite",
    ),
    "no-finite-model, the reason alone": asking(
      ofTerms,
      "holds",
      (fact) => !isStructure(fact),
      "no-finite-model",
    ),
    "infinite-only, terms": asking(ofTerms, "holds", () => true, "infinite-only"),
    "consistent, all facts": asking(finiteness, "holds", () => true, "consistent"),
    independent: askIndependent(denseOrder, unwatchedWork).evidence,
    independence: askIndependence(asymmetric, unwatchedWork).evidence,
    compare: compareTheories(
      [
        { name: "Endless", theory: endless },
        { name: "Dense", theory: denseOrder },
        { name: "Asymmetric", theory: asymmetric },
      ],
      unwatchedWork,
    ).evidence,
    weaker: askWeaker(endless, denseOrder, unwatchedWork).evidence,
    equivalent: askEquivalent(endless, denseOrder, unwatchedWork).evidence,
    minimise: minimise(asymmetric, unwatchedWork).evidence,
    dualise: askDuals("Endless", denseOrder, unwatchedWork).evidence,
  };
  return Object.fromEntries(
    Object.entries(found).map(([name, evidence]) => [name, expectEvidence(evidence)]),
  );
}

/** The evidence, which must be there, after a way through JSON. */
export function expectEvidence(evidence: Evidence | null): Evidence {
  if (evidence === null) throw new Error("a question of the tests was left open");
  return JSON.parse(JSON.stringify(evidence)) as Evidence;
}

/** The structures on carriers in evidence. */
export function structuresIn({ facts }: Evidence): readonly StructureRecord[] {
  return facts.flatMap((fact) => (fact.fact === "structure" ? [fact.structure] : []));
}

/** Words of the format that come in with infinite structures and reasons, and words that stand for others in them. */
const WORDS = [
  ...["x", "y", "z", "w", "R", "S", "f", "1", "2", "", "is", "=", "true", "false", "not", "and", "or"],
  ...["forall", "exists", "holds", "fails", "finite", "consistent", "inconsistent", "infinite-only"],
  ...["no-finite-model", "independent", "redundant", "stronger", "equivalent", "different", "open"],
  ...["structure", "derivation", "terms", "identity", "endless-order", "counting", "fewer-predecessors"],
  ...["more-successors", "dense-line", "integer-line", "half-line", "points", "tournament", "graph"],
  ...["instances", "cases", "induction", 1],
];

/** What changing evidence came to. */
export interface Attack {
  readonly tried: number;
  readonly accepted: number;
  /** Evidence that the checker has accepted though the judge finds it wrong. */
  readonly wrong: readonly Evidence[];
}

/** Every so many of the changes, from the first. */
export interface Rates {
  /** Of changes inside of derivations. */
  readonly derivations: number;
  /** Of all others. */
  readonly others: number;
}

/**
 * Changes evidence in one place after another and has the checker look at it, with the digest made to fit again.
 * @param witnesses infinite structures in which what is derived must be so
 */
export function attack(
  evidence: Evidence,
  rates: Rates,
  witnesses: readonly StructureRecord[] = structuresIn(evidence),
): Attack {
  let [tried, accepted] = [0, 0];
  const wrong: Evidence[] = [];
  const check = (changed: Evidence) => {
    tried += 1;
    const fitting = fitted(changed);
    if (!checkEvidence(fitting).accepted) return;
    accepted += 1;
    if (!isRight(fitting, witnesses)) wrong.push(fitting);
  };
  for (const changed of every(rates.others, changesOutside(evidence))) check(changed);
  for (const changed of every(rates.derivations, changesInside(evidence))) check(changed);
  return { tried, accepted, wrong };
}

function* every<Item>(count: number, items: Iterable<Item>): Generator<Item> {
  let left = 0;
  for (const item of items) {
    if (left === 0) yield item;
    left = (left + 1) % count;
  }
}

/** All changes that leave derivations as they are, which may be left out, doubled, moved or changed for one another. */
function* changesOutside(evidence: Evidence): Generator<Evidence> {
  const { facts } = evidence;
  const short = facts.map((fact, number) => (fact.fact === "derivation" ? { number } : fact));
  for (const changed of changes({ ...evidence, facts: short }, () => WORDS)) {
    const { facts: kept } = changed as { readonly facts: unknown };
    if (!Array.isArray(kept)) yield changed as Evidence;
    else
      yield {
        ...(changed as Evidence),
        facts: kept.map((fact) => {
          const number = (fact as { readonly number?: unknown } | null)?.number;
          return typeof number === "number" ? (facts[number] ?? fact) : fact;
        }),
      };
  }
}

function* changesInside(evidence: Evidence): Generator<Evidence> {
  for (const [place, fact] of evidence.facts.entries())
    if (fact.fact === "derivation")
      for (const changed of changes(fact, () => WORDS))
        yield { ...evidence, facts: evidence.facts.with(place, changed as Fact) };
}

/** The evidence with the digest of its own question, where it has one. */
export function fitted(evidence: Evidence): Evidence {
  const { sentences, question } = evidence;
  const isWhole = Array.isArray(sentences) && typeof question === "object" && question !== null;
  return isWhole ? { ...evidence, digest: digestOf(sentences, question) } : evidence;
}

type Path = readonly (string | number)[];

/** The paths to all parts of a value but the whole. */
function pathsIn(value: unknown, path: Path = []): readonly Path[] {
  if (typeof value !== "object" || value === null) return [];
  return Object.entries(value).flatMap(([key, part]) => {
    const to = [...path, Array.isArray(value) ? Number(key) : key];
    return [to, ...pathsIn(part, to)];
  });
}

function partAt(value: unknown, path: Path): unknown {
  return path.reduce((part, key) => (part as Record<string, unknown>)[key], value);
}

function withPartAt(value: unknown, [key, ...path]: Path, part: unknown): unknown {
  if (key === undefined) return part;
  if (Array.isArray(value)) return value.with(key as number, withPartAt(value[key as number], path, part));
  const holder = value as Record<string, unknown>;
  return { ...holder, [key]: withPartAt(holder[key], path, part) };
}

/** Changes in which a part of the evidence takes the place of another, chosen by a random number from 0 to below 1. */
export function* exchanges(evidence: Evidence, count: number, random: () => number): Generator<Evidence> {
  const paths = pathsIn(evidence);
  const pick = () => paths[Math.floor(random() * paths.length)]!;
  for (let done = 0; done < count; done += 1)
    yield withPartAt(evidence, pick(), partAt(evidence, pick())) as Evidence;
}

/** As {@link attack}, with exchanged parts. */
export function attackByExchange(
  evidence: Evidence,
  count: number,
  random: () => number,
  witnesses: readonly StructureRecord[] = structuresIn(evidence),
): Attack {
  let accepted = 0;
  const wrong: Evidence[] = [];
  for (const changed of exchanges(evidence, count, random)) {
    const fitting = fitted(changed);
    if (!checkEvidence(fitting).accepted) continue;
    accepted += 1;
    if (!isRight(fitting, witnesses)) wrong.push(fitting);
  }
  return { tried: count, accepted, wrong };
}

/** Sentences that say something about a relation R on every carrier. */
const SAYINGS = [
  "forall x. exists y. R(x,y) & ~R(y,x)",
  "exists x. forall y. R(x,y) -> x = y | R(y,x)",
  "forall x y. R(x,y) -> (exists z. R(x,z) & R(z,y))",
].map((text) => readSentences([text])[0]!);

/** Claims about structures on a carrier: about one in so many kinds, as the searches make it. */
export function truthEvidence(carrier: CarrierDescription, number: number): Evidence {
  const built = buildCarrier(carrier);
  const count = built.kindCount(2);
  const step = Math.max(2, Math.ceil(count / 12));
  const holds = Uint8Array.from({ length: count }, (_, kind) => Number(kind % step === number % step));
  const relation = { name: "R", places: 2, infix: false };
  const structure = { carrier: built, tables: new Map([["R", { relation, holds }]]) };
  const ask = number % 2 === 0 ? "true-in" : "false-in";
  return expectEvidence(askTruth(ask, structure, SAYINGS[number % SAYINGS.length]!, unwatchedWork).evidence);
}
