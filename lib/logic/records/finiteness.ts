/**
 * Principles by which a theory has no finite model: what must follow from it, and why that is enough. The checker of
 * evidence makes the obligations of a principle itself; a search only proposes principles and derives obligations.
 *
 * In all of them T is the theory and M a model of it with finitely many elements. If there are parameters, T entails
 * ∃p … `given`, so that there are elements p, … in M of which `given` is true; they are kept. D is the set of
 * the elements x of M of which δ, `domain`, is true, finite as M is; φ is `relation`. Each condition on D and φ is the
 * obligation ∀p … (`given` → condition), so that it is true in M of the elements that were chosen. A successor of x is
 * a y in D with φ(x, y), a predecessor of y an x in D with φ(x, y). The arguments are common practice: an endless chain
 * that comes back, Dedekind's (1888) that a finite set has no one-to-one map onto a proper part of it, counting in two
 * ways, and Russell's set.
 *
 * Elements are counted as different when they are so by identity or, where `different` lists relations, when these tell
 * them apart: x ~ y says that for each relation of the list, each of its places and all elements at its other places,
 * the relation holds with x there just if it does with y there. Then ~ is an equivalence, and elements can be exchanged
 * for others in ~ to them, one place after the other, in every formula of those relations without `=`. So whether δ is true
 * of an element, and φ of two, depends on their classes alone, and the arguments below hold of the finitely many
 * classes in place of elements.
 */
import {
  type AtomRecord,
  type FormulaRecord,
  FormulaTooLarge,
  freeVariables,
  freshName,
  Growth,
  partsOf,
  substitute,
  visitAtoms,
} from "./formulas.ts";

/** What every principle has. */
interface Common {
  /** Elements that T says exist: distinct variables, none of them x, y or z. */
  readonly parameters: readonly string[];
  /** What T says of them, with no other free variables; null just when there are no parameters. */
  readonly given: FormulaRecord | null;
  /** δ; its free variables are among x and the parameters. */
  readonly domain: FormulaRecord;
  /** φ; its free variables are among x, y and the parameters, and for `pairs` also z. */
  readonly relation: FormulaRecord;
}

/** A relation, by its name and number of places. */
export type CountedRelation = readonly [string, number];

interface Counted extends Common {
  /** By what elements are told apart: by identity or by relations, all those of δ and φ among them, which are then without `=`. */
  readonly different: "identity" | readonly CountedRelation[];
}

/**
 * D is not empty; φ is irreflexive and transitive on D; every x in D has a successor.
 *
 * Proof that M is not finite: let x₀ be in D, and x₁, x₂, … each a successor of the one before. If D is finite, xᵢ = xⱼ for
 * some i < j. By transitivity φ(xᵢ, xⱼ), against φ being irreflexive.
 */
export interface EndlessOrderRecord extends Common {
  readonly principle: "endless-order";
  /** Whether φ is to be irreflexive and transitive on all elements and not only on D. */
  readonly everywhere: boolean;
}

/**
 * Every x in D has at least k successors, and every y in D at most j predecessors. If j < k, D is not empty. If j = k,
 * some element of D has at most k − 1 predecessors, or some element of D has at least k + 1 successors.
 *
 * Proof that M is not finite: count the pairs of D with φ, n being the number of elements of D. By the first elements
 * there are at least k·n, by the second at most j·n. If j < k, then n = 0. If j = k, the element with fewer predecessors
 * makes them at most k·n − 1, or the one with more successors makes them at least k·n + 1. For k = 1, φ contains a
 * one-to-one map of D into D that is not onto, or its converse a map of D onto D that is not one to one.
 */
export interface CountingRecord extends Counted {
  readonly principle: "counting";
  /** k, from 1 to {@link MOST_COUNTED}. */
  readonly successors: number;
  /** j, from 1 to k. */
  readonly predecessors: number;
  /** Whether there are to be at most j predecessors in all and not only in D, for all elements y. */
  readonly everywhere: boolean;
  /** What tips the balance; null just if j < k. */
  readonly spare: "fewer-predecessors" | "more-successors" | null;
}

/**
 * All x, y in D have a z in D with φ(x, y, z); every z in D has at most j pairs of elements x, y of D with φ(x, y, z); D
 * has more than j elements.
 *
 * Proof that M is not finite: with n elements in D there are n² pairs, each with a z, and at most j pairs for each of n
 * elements z. So n² ≤ j·n, and n ≤ j.
 */
export interface PairsRecord extends Counted {
  readonly principle: "pairs";
  /** j, from 1 to {@link MOST_COUNTED}. */
  readonly pairs: number;
}

/**
 * Some element of D has no predecessors; all x, y in D have a z in D whose predecessors are those of x and y itself.
 *
 * Proof that M is not finite: if D is finite, then for every set W of elements of D some z in D has just W as its
 * predecessors, by adding the elements of W one after the other. Let W be the set of all w in D without φ(w, w).
 * Then φ(z, z) just if z is in W, just if not φ(z, z).
 */
export interface ComprehensionRecord extends Counted {
  readonly principle: "comprehension";
}

export type PrincipleRecord = EndlessOrderRecord | CountingRecord | PairsRecord | ComprehensionRecord;

/** Up to what successors, predecessors and pairs are counted. */
export const MOST_COUNTED = 12;

/** What an obligation is about. */
export type ObligationKind =
  | "parameters"
  | "size"
  | "irreflexive"
  | "transitive"
  | "successors"
  | "predecessors"
  | "spare"
  | "values";

/** A closed sentence. */
export interface ObligationRecord {
  readonly kind: ObligationKind;
  readonly sentence: FormulaRecord;
}

/**
 * Sentences of which holds: a theory that entails all of them has no finite model. Empty domains do not occur. Each
 * proof stands at the type of its principle.
 * @param principle of the right types; nothing else is trusted
 * @returns null when the principle is not of its form, or its obligations would be too large
 */
export function obligationsOf(principle: PrincipleRecord): readonly FormulaRecord[] | null {
  return obligationRecordsOf(principle)?.map(({ sentence }) => sentence) ?? null;
}

/** The same, each with what it is about. */
export function obligationRecordsOf(principle: PrincipleRecord): readonly ObligationRecord[] | null {
  try {
    const growth = new Growth();
    return isWellFormed(principle, growth) ? new Obligations(principle, growth).all() : null;
  } catch (problem) {
    if (problem instanceof FormulaTooLarge) return null;
    throw problem;
  }
}

/** The variables that δ and φ speak of. */
const ELEMENTS: readonly string[] = ["x", "y", "z"];
const [X, Y, Z] = ELEMENTS as [string, string, string];

function isWellFormed(principle: PrincipleRecord, growth: Growth): boolean {
  const { parameters, given, domain, relation } = principle;
  const isWithin = (formula: FormulaRecord, own: readonly string[]) =>
    freeVariables(formula).every((variable) => own.includes(variable) || parameters.includes(variable));
  return (
    parameters.every((one, place) => !ELEMENTS.includes(one) && parameters.indexOf(one) === place) &&
    (given === null) === (parameters.length === 0) &&
    (given === null || isWithin(given, [])) &&
    isWithin(domain, [X]) &&
    isWithin(relation, principle.principle === "pairs" ? [X, Y, Z] : [X, Y]) &&
    (principle.principle === "endless-order" || isCounted(principle, growth))
  );
}

function isCounted(principle: Exclude<PrincipleRecord, EndlessOrderRecord>, growth: Growth): boolean {
  const { different, domain, relation } = principle;
  const isNumber = (value: number, most: number) => Number.isInteger(value) && value >= 1 && value <= most;
  if (different !== "identity") {
    const atoms: AtomRecord[] = [];
    for (const formula of [domain, relation]) visitAtoms(formula, growth, (atom) => atoms.push(atom));
    const isListed = (atom: AtomRecord) =>
      atom[0] === "is" && different.some(([name, places]) => name === atom[1] && places === atom.length - 2);
    if (!different.every(([, places]) => isNumber(places, MOST_PLACES)) || !atoms.every(isListed))
      return false;
  }
  switch (principle.principle) {
    case "counting": {
      const { successors, predecessors, spare } = principle;
      return (
        isNumber(successors, MOST_COUNTED) &&
        isNumber(predecessors, successors) &&
        (spare === null) === predecessors < successors
      );
    }
    case "pairs":
      return isNumber(principle.pairs, MOST_COUNTED);
    case "comprehension":
      return true;
  }
}

/** Places of relations by which elements are told apart. */
const MOST_PLACES = 100;

/** What is asked of chosen parameters. */
type Condition = readonly [ObligationKind, FormulaRecord];

class Obligations {
  readonly #principle: PrincipleRecord;
  readonly #growth: Growth;
  readonly #parameters: ReadonlySet<string>;

  constructor(principle: PrincipleRecord, growth: Growth) {
    this.#principle = principle;
    this.#growth = growth;
    this.#parameters = new Set(principle.parameters);
  }

  all(): readonly ObligationRecord[] {
    const { parameters, given } = this.#principle;
    const conditions = this.#conditions().map(([kind, sentence]) => ({ kind, sentence }));
    if (given === null) return conditions;
    const isAnything = given[0] === "true";
    // What does not speak of the parameters is true whatever they are.
    const close = (condition: FormulaRecord) =>
      freeVariables(condition).length === 0
        ? condition
        : forall(parameters, implies(isAnything ? [] : [given], condition));
    const existence = { kind: "parameters", sentence: exists(parameters, given) } as const;
    return [
      ...(isAnything ? [] : [existence]),
      ...conditions.map(({ kind, sentence }) => ({ kind, sentence: close(sentence) })),
    ];
  }

  #conditions(): readonly Condition[] {
    const principle = this.#principle;
    switch (principle.principle) {
      case "endless-order":
        return [
          ...this.#sizeAtLeast(1),
          this.#irreflexive(principle.everywhere),
          ...this.#transitive(principle.everywhere),
          this.#everySuccessors(1),
        ];
      case "counting": {
        const { successors: k, predecessors: j, spare } = principle;
        const balance = [this.#everySuccessors(k), ...this.#everyPredecessors(j, principle.everywhere)];
        if (spare === null) return [...this.#sizeAtLeast(1), ...balance];
        const one =
          spare === "fewer-predecessors" ? this.#somePredecessors(k - 1) : this.#someSuccessors(k + 1);
        return [...balance, one];
      }
      case "pairs":
        return [
          this.#everyPair(),
          ...this.#everyValue(principle.pairs),
          ...this.#sizeAtLeast(principle.pairs + 1),
        ];
      case "comprehension":
        return [this.#somePredecessors(0), this.#adjunction()];
    }
  }

  /** None when it is true of all domains. */
  #sizeAtLeast(count: number): readonly Condition[] {
    const elements = this.#names(count);
    const parts = [...this.#inside(elements), ...this.#allDifferent(elements)];
    return parts.length === 0 ? [] : [["size", exists(elements, and(parts))]];
  }

  #irreflexive(everywhere: boolean): Condition {
    const [x] = this.#names(1) as [string];
    return ["irreflexive", forall([x], deny([...this.#inside([x], everywhere), this.#related(x, x)]))];
  }

  #transitive(everywhere: boolean): readonly Condition[] {
    const [x, y, z] = this.#names(3) as [string, string, string];
    const given = [...this.#inside([x, y, z], everywhere), this.#related(x, y), this.#related(y, z)];
    return splitUp("transitive", [x, y, z], given, this.#related(x, z));
  }

  #everySuccessors(count: number): Condition {
    const [x, ...others] = this.#names(count + 1) as [string, ...string[]];
    const has = exists(others, and(this.#successors(x, others)));
    return ["successors", forall([x], implies(this.#inside([x]), has))];
  }

  #someSuccessors(count: number): Condition {
    const [x, ...others] = this.#names(count + 1) as [string, ...string[]];
    return ["spare", exists([x, ...others], and([...this.#inside([x]), ...this.#successors(x, others)]))];
  }

  #everyPredecessors(most: number, everywhere: boolean): readonly Condition[] {
    const elements = this.#names(most + 2);
    const [y, others] = [elements.at(-1)!, elements.slice(0, -1)];
    const given = [...this.#inside([y], everywhere), ...this.#predecessors(others, y, everywhere)];
    // Of two: since they can change places, it is enough that what one is related to, the other is.
    const conclusion =
      most === 1 ? this.#same(others[0]!, others[1]!, "implies") : this.#someSame(others.map((one) => [one]));
    return splitUp("predecessors", [...others, y], given, conclusion);
  }

  #somePredecessors(most: number): Condition {
    const elements = this.#names(most + 2);
    const [y, others] = [elements.at(-1)!, elements.slice(0, -1)];
    const given = this.#predecessors(others, y);
    const body = most === 0 ? deny(given) : implies(given, this.#someSame(others.map((one) => [one])));
    return ["spare", exists([y], and([...this.#inside([y]), forall(others, body)]))];
  }

  #everyPair(): Condition {
    const [x, y, z] = this.#names(3) as [string, string, string];
    const has = exists([z], and([...this.#inside([z]), this.#related(x, y, z)]));
    return ["values", forall([x, y], implies(this.#inside([x, y]), has))];
  }

  /** Of one more pairs of the same value than there may be, two are the same. */
  #everyValue(most: number): readonly Condition[] {
    const elements = this.#names(2 * most + 3);
    const [z, others] = [elements.at(-1)!, elements.slice(0, -1)];
    const pairs = Array.from({ length: most + 1 }, (_, place) => others.slice(2 * place, 2 * place + 2));
    const given = [...this.#inside(elements), ...pairs.map(([x, y]) => this.#related(x!, y!, z))];
    return splitUp("predecessors", elements, given, this.#someSame(pairs));
  }

  #adjunction(): Condition {
    const [x, y, z, w] = this.#names(4) as [string, string, string, string];
    const either = or([this.#related(w, x), this.#same(w, y)]);
    const like = forall([w], implies(this.#inside([w]), ["iff", this.#related(w, z), either]));
    const has = exists([z], and([...this.#inside([z]), like]));
    return ["values", forall([x, y], implies(this.#inside([x, y]), has))];
  }

  /** That different elements of D are successors of x. */
  #successors(x: string, elements: readonly string[]): readonly FormulaRecord[] {
    return [
      ...this.#inside(elements),
      ...elements.map((one) => this.#related(x, one)),
      ...this.#allDifferent(elements),
    ];
  }

  /** That elements, of D unless they may be any, have φ to y. */
  #predecessors(elements: readonly string[], y: string, everywhere = false): readonly FormulaRecord[] {
    return [...this.#inside(elements, everywhere), ...elements.map((one) => this.#related(one, y))];
  }

  #allDifferent(elements: readonly string[]): readonly FormulaRecord[] {
    return couples(elements).map(([one, other]): FormulaRecord => ["not", this.#same(one, other)]);
  }

  /** That two of some tuples are the same. */
  #someSame(tuples: readonly (readonly string[])[]): FormulaRecord {
    return or(
      couples(tuples).map(([one, other]) =>
        and(one.map((element, place) => this.#same(element, other[place]!))),
      ),
    );
  }

  /** @param how `implies` for what, said of both elements in both orders, says that they are the same */
  #same(one: string, other: string, how: "iff" | "implies" = "iff"): FormulaRecord {
    const { different } = this.#principle as Exclude<PrincipleRecord, EndlessOrderRecord>;
    this.#growth.add();
    if (different === "identity") return ["=", one, other];
    return and(different.flatMap((relation) => this.#alike(relation, one, other, how)));
  }

  /** For each place of a relation: that the other element can stand there if (just if) the one can. */
  #alike(
    [name, places]: CountedRelation,
    one: string,
    other: string,
    how: "iff" | "implies",
  ): readonly FormulaRecord[] {
    this.#growth.add(2 * places * places);
    const others = newNames(places - 1, new Set([one, other]));
    return Array.from({ length: places }, (_, place): FormulaRecord => {
      const holds = (element: string): FormulaRecord => ["is", name, ...others.toSpliced(place, 0, element)];
      return forall(others, [how, holds(one), holds(other)]);
    });
  }

  /** That elements are in D; nothing where all are, or where they may be any. */
  #inside(elements: readonly string[], everywhere = false): readonly FormulaRecord[] {
    const { domain } = this.#principle;
    if (everywhere || domain[0] === "true") return [];
    return elements.map((element) => substitute(domain, new Map([[X, element]]), this.#growth));
  }

  #related(x: string, y: string, z = Z): FormulaRecord {
    const places = new Map([
      [X, x],
      [Y, y],
      [Z, z],
    ]);
    return substitute(this.#principle.relation, places, this.#growth);
  }

  /** Variables for elements, none of them a parameter. */
  #names(count: number): readonly string[] {
    return newNames(count, this.#parameters);
  }
}

const NAMES = ["x", "y", "z", "w", "u", "v"];

/** So many distinct variables that are not taken. */
function newNames(count: number, taken: ReadonlySet<string>): readonly string[] {
  const all = new Set(taken);
  return Array.from({ length: count }, (_, place) => {
    const round = Math.floor(place / NAMES.length);
    const name = freshName(NAMES[place % NAMES.length]! + (round === 0 ? "" : round), all);
    all.add(name);
    return name;
  });
}

/** All pairs of members at different places. */
function couples<Member>(members: readonly Member[]): readonly (readonly [Member, Member])[] {
  return members.flatMap((one, place) => members.slice(place + 1).map((other) => [one, other] as const));
}

function forall(variables: readonly string[], body: FormulaRecord): FormulaRecord {
  return variables.reduceRight<FormulaRecord>((inner, variable) => ["forall", variable, inner], body);
}

function exists(variables: readonly string[], body: FormulaRecord): FormulaRecord {
  return variables.reduceRight<FormulaRecord>((inner, variable) => ["exists", variable, inner], body);
}

function and(parts: readonly FormulaRecord[]): FormulaRecord {
  const flat = parts.flatMap((part) => (part[0] === "and" ? partsOf(part) : [part]));
  return flat.length > 1 ? ["and", ...flat] : (flat[0] ?? ["true"]);
}

function or(parts: readonly FormulaRecord[]): FormulaRecord {
  const flat = parts.flatMap((part) => (part[0] === "or" ? partsOf(part) : [part]));
  return flat.length > 1 ? ["or", ...flat] : (flat[0] ?? ["false"]);
}

function implies(given: readonly FormulaRecord[], body: FormulaRecord): FormulaRecord {
  return given.length === 0 ? body : ["implies", and(given), body];
}

/** A sentence for each part of a conclusion, since they are derived one by one. */
function splitUp(
  kind: ObligationKind,
  variables: readonly string[],
  given: readonly FormulaRecord[],
  conclusion: FormulaRecord,
): readonly Condition[] {
  const parts = conclusion[0] === "and" ? partsOf(conclusion) : [conclusion];
  return parts.map((part) => [kind, forall(variables, implies(given, part))]);
}

/** That not all of some formulas, at least one, are true. */
function deny(parts: readonly FormulaRecord[]): FormulaRecord {
  return ["not", and(parts)];
}
