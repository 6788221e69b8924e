/** Measures of sentences, and the decidable fragments that they fall into, with what is published about these. */

import { partCount } from "./clausal-formulas.ts";
import {
  and,
  depthOf,
  exists,
  type Formula,
  freeVariables,
  not,
  usesIdentity,
  variablesOf,
} from "./formula.ts";
import { MAXIMAL_WITH_IDENTITY, PUBLISHED } from "./fragments-published.ts";
import {
  isAeaKrom,
  isAtMostOne,
  isMaslov,
  middleUniversals,
  monadicRelations,
  transitiveRelation,
  widthOf,
  witnessesOf,
} from "./fragments-shapes.ts";
import { toMiniscopedForm } from "./normal-forms/miniscope.ts";
import { alternationsOf, bestPrefix, otherKind, type Prefix } from "./normal-forms/prenex.ts";
import { toTightNegationForm } from "./normal-forms/prepare.ts";
import { FormTooLarge, type Limits } from "./normal-forms/result.ts";
import { simplify } from "./normal-forms/simplify.ts";
import { StepRecorder } from "./normal-forms/steps.ts";

/** The fragments that are recognised. */
export type FragmentName =
  | "bernays-schoenfinkel-ramsey"
  | "ackermann"
  | "goedel-kalmar-schuette"
  | "two-variable"
  | "two-variable-counting"
  | "two-variable-one-transitive"
  | "monadic"
  | "maslov"
  | "aea-krom";

/** A fragment that a set of sentences falls into. */
export interface Membership {
  readonly fragment: FragmentName;
  /** For people: "Bernays–Schönfinkel–Ramsey class". */
  readonly name: string;
  /** What the sentences of the fragment look like: "∃*∀*, identity allowed". */
  readonly form: string;
  /** `finite-only`: whether there is a finite model can be decided; whether there is any is not known to be. */
  readonly decidable: "yes" | "finite-only";
  /** Whether every satisfiable sentence of the fragment has a finite model. */
  readonly finiteModelProperty: boolean;
  /** What is published on the size of models, or on complexity; null when nothing is cited. */
  readonly bound: string | null;
  /**
   * With a model, the sentences have one on at most this many points. Null where the published bound is no explicit
   * number, and where it is beyond 2^53.
   */
  readonly points: number | null;
  /** The maximal decidable prefix-vocabulary class that it belongs to; null when it is no such class. */
  readonly maximalClass: string | null;
  /** Authors and years. */
  readonly source: string;
}

/** What `describe` says of a sentence, or of a theory as the conjunction of its axioms. */
export interface SyntaxReport {
  /** The quantifier rank, as written. */
  readonly depth: number;
  /** Different variables, as written, in the sentence that has the most. */
  readonly variables: number;
  /** How many suffice when quantifiers are moved inwards and names are used again; at most `variables`. */
  readonly leastVariables: number;
  /** How often the kind of quantifier changes along the prefix; null where that is. */
  readonly alternations: number | null;
  /**
   * The prefix of a prenex form with few alternations, from the left; empty without quantifiers, null when the
   * sentences are too large to be brought to one.
   */
  readonly prefix: readonly PrefixBlock[] | null;
  readonly fragments: readonly Membership[];
  /** See {@link finiteCheckBound}. */
  readonly finiteCheck: FiniteCheck | null;
}

export interface PrefixBlock {
  readonly kind: "forall" | "exists";
  /** At least 1. */
  readonly count: number;
}

/** A published bound on the size of a smallest model, as an explicit number. */
export interface FiniteCheck {
  /** The sentences have a model if and only if they have one on at most this many points; at least 1. */
  readonly points: number;
  /** Why, for people: the fragment, or how two of them are put together. */
  readonly reason: string;
  readonly source: string;
}

/** Larger sentences are measured as they are written, and put into no fragment that needs a normal form. */
const LIMITS: Limits = { parts: 20_000, levels: 1000 };

/** Measures sentences together, as their conjunction. Free variables are read as if quantified by an outer ∃. */
export function describeSyntax(sentences: readonly Formula[]): SyntaxReport {
  const depth = Math.max(0, ...sentences.map(depthOf));
  const variables = Math.max(0, ...sentences.map((sentence) => variablesOf(sentence).length));
  return (
    withinLimits(() => {
      const forms = formsOf(sentences);
      const prefix = fewestAlternations(forms);
      return {
        depth,
        variables,
        leastVariables: Math.min(variables, leastVariables(forms)),
        alternations: alternationsOf(prefix),
        prefix: blocksOf(prefix),
        fragments: membershipsOf(forms),
        finiteCheck: finiteCheckOf(forms),
      };
    }) ?? {
      depth,
      variables,
      leastVariables: variables,
      alternations: null,
      prefix: null,
      fragments: variables <= 2 ? [{ ...PUBLISHED["two-variable"], points: null }] : [],
      finiteCheck: null,
    }
  );
}

/**
 * The least published number n such that the sentences have a common model if and only if they have one on at most n
 * points; null when they are in no fragment with an explicit bound.
 *
 * Monadic sentences and ∃*∀* sentences go together: in a model of both, take the points that the existential
 * quantifiers of the latter need, and 2^k·v more so that each combination of the k relations of the former keeps v
 * points, or all it has. The latter hold in every substructure that contains their points; the former, in v variables,
 * cannot tell a combination with v points from one with more (Ehrenfeucht–Fraïssé games with v pebbles), and without
 * identity not from one with a single point.
 */
export function finiteCheckBound(sentences: readonly Formula[]): FiniteCheck | null {
  return withinLimits(() => finiteCheckOf(formsOf(sentences)));
}

/** As {@link finiteCheckBound}, for a countermodel of an entailment. */
export function entailmentCheckBound(premises: readonly Formula[], conclusion: Formula): FiniteCheck | null {
  return finiteCheckBound([...premises, not(conclusion)]);
}

/** A sentence in negation normal form without vacuous quantifiers: as it was written, and miniscoped. */
interface Forms {
  readonly written: Formula;
  readonly miniscoped: Formula;
}

const knownForms = new WeakMap<Formula, Forms>();

/** @throws FormTooLarge */
function formsOf(sentences: readonly Formula[]): readonly Forms[] {
  return sentences.map((sentence) => {
    const known = knownForms.get(sentence);
    if (known !== undefined) return known;
    if (partCount(sentence) > LIMITS.parts) throw new FormTooLarge("parts", LIMITS.parts);
    const silent = new StepRecorder(false);
    const closed = exists(freeVariables(sentence), sentence);
    const written = toTightNegationForm(closed, LIMITS, silent);
    const miniscoped = simplify(toMiniscopedForm(written, LIMITS, silent), silent);
    const forms = { written, miniscoped };
    knownForms.set(sentence, forms);
    return forms;
  });
}

function withinLimits<Result>(work: () => Result): Result | null {
  try {
    return work();
  } catch (problem) {
    if (problem instanceof FormTooLarge) return null;
    throw problem;
  }
}

/** The lesser of what a measure gives for the two forms; null when it gives nothing for either. */
function least({ written, miniscoped }: Forms, measure: (formula: Formula) => number | null): number | null {
  const [left, right] = [measure(written), measure(miniscoped)];
  if (left === null || right === null) return left ?? right;
  return Math.min(left, right);
}

/** The greatest, or the sum, of a measure over sentences; null when one has none. */
function overall(
  forms: readonly Forms[],
  measure: (formula: Formula) => number | null,
  join: (left: number, right: number) => number,
): number | null {
  let total = 0;
  for (const form of forms) {
    const own = least(form, measure);
    if (own === null) return null;
    total = join(total, own);
  }
  return total;
}

function leastVariables(forms: readonly Forms[]): number {
  return overall(forms, widthOf, Math.max) ?? 0;
}

function fewestAlternations(forms: readonly Forms[]): Prefix {
  const [written, miniscoped] = (["written", "miniscoped"] as const).map((which) =>
    bestPrefix(and(...forms.map((form) => form[which]))),
  ) as [Prefix, Prefix];
  return alternationsOf(miniscoped) < alternationsOf(written) ? miniscoped : written;
}

function blocksOf({ first, counts }: Prefix): readonly PrefixBlock[] {
  return counts
    .map((count, index) => ({ kind: index % 2 === 0 ? first : otherKind(first), count }))
    .filter(({ count }) => count > 0);
}

/** The conjuncts of the miniscoped sentences. */
function conjunctsOf(forms: readonly Forms[]): readonly Formula[] {
  return forms.flatMap(({ miniscoped }) =>
    miniscoped.kind === "and" ? miniscoped.parts : miniscoped.kind === "true" ? [] : [miniscoped],
  );
}

/** @throws FormTooLarge */
function membershipsOf(forms: readonly Forms[]): readonly Membership[] {
  const hasIdentity = forms.some(
    ({ written, miniscoped }) => usesIdentity(written) || usesIdentity(miniscoped),
  );
  const conjuncts = conjunctsOf(forms);
  const found: Membership[] = [];
  const add = (fragment: FragmentName, points: number | null = null) => {
    const published = PUBLISHED[fragment];
    const withIdentity = hasIdentity ? MAXIMAL_WITH_IDENTITY[fragment] : undefined;
    found.push({ ...published, maximalClass: withIdentity ?? published.maximalClass, points });
  };

  const witnesses = overall(forms, witnessesOf, (left, right) => left + right);
  if (witnesses !== null) add("bernays-schoenfinkel-ramsey", Math.max(1, witnesses));
  const monadic = monadicBound(forms.map(({ miniscoped }) => miniscoped));
  if (monadic !== null) add("monadic", safe(monadic));
  const universals = overall(forms, middleUniversals, Math.max);
  if (universals !== null && universals <= 1) add("ackermann");
  if (universals !== null && universals <= 2 && !hasIdentity) add("goedel-kalmar-schuette");
  if (leastVariables(forms) <= 2) add("two-variable");
  else {
    const wide = conjuncts.filter((conjunct) => widthOf(conjunct) > 2);
    const transitive = new Set(wide.map((conjunct) => transitiveRelation(conjunct, LIMITS)));
    if (wide.every(isCounting)) add("two-variable-counting");
    else if (transitive.size === 1 && !transitive.has(null)) add("two-variable-one-transitive");
  }
  if (!hasIdentity) {
    if (withinLimits(() => isMaslov(conjuncts, LIMITS)) ?? false) add("maslov");
    const whole = (which: keyof Forms) => and(...forms.map((form) => form[which]));
    const isKrom = (formula: Formula) => withinLimits(() => isAeaKrom(formula, LIMITS)) ?? false;
    if (isKrom(whole("written")) || isKrom(whole("miniscoped"))) add("aea-krom");
  }
  return found;
}

/** Whether a sentence, or its negation, says "at most one"; the fragment with counting is closed under negation. */
function isCounting(sentence: Formula): boolean {
  const denied = () => toTightNegationForm(not(sentence), LIMITS, new StepRecorder(false));
  return withinLimits(() => isAtMostOne(sentence, LIMITS) || isAtMostOne(denied(), LIMITS)) ?? false;
}

/** The bound for monadic sentences together, perhaps infinite; null when one is not monadic. */
function monadicBound(sentences: readonly Formula[]): number | null {
  const relations = new Set<string>();
  for (const sentence of sentences) {
    const own = monadicRelations(sentence);
    if (own === null) return null;
    for (const { name } of own) relations.add(name);
  }
  const withIdentity = sentences.filter(usesIdentity);
  const copies = Math.max(1, ...withIdentity.map(widthOf));
  return 2 ** relations.size * copies;
}

function safe(points: number): number | null {
  return Number.isSafeInteger(points) ? points : null;
}

function finiteCheckOf(forms: readonly Forms[]): FiniteCheck | null {
  const candidates: FiniteCheck[] = [];
  const consider = (points: number | null, fragments: readonly FragmentName[], reason: string) => {
    if (points === null || !Number.isSafeInteger(points)) return;
    const sources = fragments.map((fragment) => PUBLISHED[fragment].source);
    candidates.push({ points: Math.max(1, points), reason, source: sources.join("; ") });
  };
  consider(
    overall(forms, witnessesOf, (left, right) => left + right),
    ["bernays-schoenfinkel-ramsey"],
    PUBLISHED["bernays-schoenfinkel-ramsey"].name,
  );
  const conjuncts = conjunctsOf(forms);
  const [oneByOne, others] = split(conjuncts, (conjunct) => monadicRelations(conjunct) !== null);
  const [prefixed, rest] = split(conjuncts, (conjunct) => witnessesOf(conjunct) !== null);
  if (others.length === 0) consider(monadicBound(oneByOne), ["monadic"], PUBLISHED.monadic.name);
  const both = ["monadic", "bernays-schoenfinkel-ramsey"] as const;
  const together = `${PUBLISHED.monadic.name} and ${PUBLISHED["bernays-schoenfinkel-ramsey"].name} together`;
  for (const [monadic, witnessed] of [
    [oneByOne, others],
    [rest, prefixed],
  ] as const)
    if (monadic.length > 0 && witnessed.length > 0)
      consider(sum(monadicBound(monadic), witnessesTogether(witnessed)), both, together);
  return candidates.reduce<FiniteCheck | null>(
    (best, one) => (best === null || one.points < best.points ? one : best),
    null,
  );
}

function split(
  conjuncts: readonly Formula[],
  test: (conjunct: Formula) => boolean,
): readonly [readonly Formula[], readonly Formula[]] {
  return [conjuncts.filter(test), conjuncts.filter((conjunct) => !test(conjunct))];
}

function witnessesTogether(conjuncts: readonly Formula[]): number | null {
  return conjuncts.reduce<number | null>((total, conjunct) => sum(total, witnessesOf(conjunct)), 0);
}

function sum(left: number | null, right: number | null): number | null {
  return left === null || right === null ? null : left + right;
}
