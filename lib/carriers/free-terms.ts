/**
 * Free terms: the second kind of infinite structure, for axioms that no carrier has a model of (pairing, empty set and
 * adjunction). The elements are all ground terms of a few constructors, each the name of itself; a relation is defined by
 * recursion on one of its places. The theory of such a structure may be undecidable, so that nothing here decides
 * sentences: a sentence is accepted with a certificate (`free-terms-check.ts`), and refused without one.
 *
 * What is true of all ground terms (Mal'cev 1961, locally free algebras): terms with different constructors are different,
 * terms with one constructor are the same only if their arguments are, and no term is a proper part of itself.
 */
import { partsOf, type TermFormulaRecord, type TermRecord } from "../logic/records/formulas.ts";

/**
 * A structure of free terms. For empty set and adjunction, with elements e and f(x, y):
 * `{"constructors": {"e": [], "f": ["x", "y"]}, "relations": {"R": {"on": 1, "others": ["w"], "cases":
 * {"e": ["false"], "f": ["or", ["is", "R", "w", "x"], ["=", "w", "y"]]}}}}`
 */
export interface TermsRecord {
  /**
   * The names of the arguments of each constructor, no two the same; none for a constant. There is a constant, and a
   * constructor with arguments: so there are infinitely many ground terms.
   */
  readonly constructors: Readonly<Record<string, readonly string[]>>;
  /** By the name of the relation. */
  readonly relations: Readonly<Record<string, RecursionRecord>>;
}

/** A relation, by recursion on one of its places. */
export interface RecursionRecord {
  /** The place that the recursion is on, counted from 0. */
  readonly on: number;
  /** The variables at its other places, in order; no two the same, and none the name of an argument of a constructor. */
  readonly others: readonly string[];
  /**
   * For each constructor, where the relation holds of these variables and a term with it: a formula without quantifiers
   * whose variables are these and the arguments of the constructor. Wherever it speaks of a relation of the record, such
   * an argument stands at the place that the recursion of that relation is on. So it speaks of smaller terms there, and
   * all relations together are well defined.
   */
  readonly cases: Readonly<Record<string, TermFormulaRecord>>;
}

/**
 * Why a sentence is true. Its negation is refuted: of what stands in it outside of other quantifiers, each ∃ is dropped,
 * with a new parameter for its variable, until no such ∃ is left; parameters are called `"1"`, `"2"`, … in the order in
 * which they come, from left to right, and stand for any ground terms. Then come the steps. What is left after the last
 * must be false for all values of the parameters by what `free-terms-check.ts` knows; ∀ that are left count as true.
 */
export type CertificateRecord = readonly CertificateStep[];

/**
 * - `["instances", t, …]`: the first ∀ that stands outside of other quantifiers gives way to the conjunction of its
 *   instances at these terms, whose variables are parameters. ∃ in them are dropped as before;
 * - `["cases", p, {"e": […], …}]`: the parameter p is a term with one of the constructors, and its arguments are new
 *   parameters; for each constructor the steps that go on from there. The last step of its list;
 * - `["induction", p, {…}]`: as cases; besides, what is to be refuted is taken not to be true with one of the
 *   arguments in place of p: p is a smallest term with which it is.
 */
export type CertificateStep =
  | readonly ["instances", ...TermRecord[]]
  | readonly ["cases" | "induction", string, Readonly<Record<string, CertificateRecord>>];

/** Constructors, arguments and places beyond which a record is refused. */
const MOST_NAMES = 100;
/** Levels of formulas, terms and certificates beyond which they are refused. */
export const DEEPEST_TERMS = 200;

/** How many parts formulas have that are neither atoms nor quantified; conjunctions and disjunctions may have more. */
const LEAST_PARTS: ReadonlyMap<unknown, number> = new Map(
  Object.entries({ true: 0, false: 0, not: 1, and: 2, or: 2, implies: 2, iff: 2 }),
);

/** The value as a record of free terms, or null when it is none: everything that is said of the fields is checked. */
export function readTerms(value: unknown): TermsRecord | null {
  if (!isObject(value, "constructors", "relations")) return null;
  const { constructors, relations } = value;
  if (!isObject(constructors) || !isObject(relations)) return null;
  const args = Object.values(constructors);
  if (args.length > MOST_NAMES || !args.every(areNames)) return null;
  if (!args.some((one) => one.length === 0) || !args.some((one) => one.length > 0)) return null;
  const record = value as unknown as TermsRecord;
  for (const relation of Object.values(relations)) {
    if (!isObject(relation, "on", "others", "cases")) return null;
    const { on, others, cases } = relation;
    if (!areNames(others) || !isObject(cases, ...Object.keys(constructors))) return null;
    if (!Number.isSafeInteger(on) || (on as number) < 0 || (on as number) > others.length) return null;
  }
  const isCase = ({ others }: RecursionRecord, [symbol, body]: readonly [string, unknown]) => {
    const own = record.constructors[symbol]!;
    return areNames([...others, ...own]) && isCaseFormula(body, record, new Set(others), new Set(own), 0);
  };
  const all = Object.values(record.relations);
  return all.every((one) => Object.entries(one.cases).every((entry) => isCase(one, entry))) ? record : null;
}

/** Whether the value is a formula that may define a relation of the record at a term with arguments `own`. */
function isCaseFormula(
  value: unknown,
  record: TermsRecord,
  others: ReadonlySet<string>,
  own: ReadonlySet<string>,
  depth: number,
): value is TermFormulaRecord {
  if (!Array.isArray(value) || depth > DEEPEST_TERMS) return false;
  const [kind, ...rest] = value as unknown[];
  const areTerms = (terms: readonly unknown[]) =>
    terms.every((term) => isTerm(term, record, (name) => others.has(name) || own.has(name)));
  if (kind === "is") {
    const [name, ...args] = rest;
    if (typeof name !== "string" || !Object.hasOwn(record.relations, name)) return false;
    const relation = record.relations[name]!;
    const isSmaller = own.has(args[relation.on] as string);
    return isSmaller && args.length === relation.others.length + 1 && areTerms(args);
  }
  if (kind === "=") return rest.length === 2 && areTerms(rest);
  const least = LEAST_PARTS.get(kind);
  if (least === undefined || rest.length < least) return false;
  if (rest.length > least && kind !== "and" && kind !== "or") return false;
  return partsOf(value as unknown as TermFormulaRecord).every((part) =>
    isCaseFormula(part, record, others, own, depth + 1),
  );
}

/** Whether the value is a term of the constructors and of variables of a certain kind. */
export function isTerm(
  value: unknown,
  record: TermsRecord,
  isVariable: (name: string) => boolean,
  depth = 0,
): value is TermRecord {
  if (typeof value === "string") return isVariable(value);
  if (!Array.isArray(value) || depth > DEEPEST_TERMS) return false;
  const [name, ...args] = value as unknown[];
  return (
    typeof name === "string" &&
    Object.hasOwn(record.constructors, name) &&
    record.constructors[name]!.length === args.length &&
    args.every((arg) => isTerm(arg, record, isVariable, depth + 1))
  );
}

/** The value as a certificate for the record, or null when it does not have the form of one. */
export function readCertificate(value: unknown, record: TermsRecord): CertificateRecord | null {
  return isCertificate(value, record, 0) ? value : null;
}

function isCertificate(value: unknown, record: TermsRecord, depth: number): value is CertificateRecord {
  if (!Array.isArray(value) || depth > DEEPEST_TERMS) return false;
  return value.every((step: unknown, place) => {
    if (!Array.isArray(step)) return false;
    const [kind, ...rest] = step as unknown[];
    if (kind === "instances") return rest.every((term) => isTerm(term, record, () => true));
    if ((kind !== "cases" && kind !== "induction") || rest.length !== 2 || place !== value.length - 1)
      return false;
    const [parameter, branches] = rest;
    return (
      typeof parameter === "string" &&
      isObject(branches, ...Object.keys(record.constructors)) &&
      Object.values(branches).every((branch) => isCertificate(branch, record, depth + 1))
    );
  });
}

/** Whether the value is an object, and where keys are given, one with just these. */
function isObject(value: unknown, ...keys: readonly string[]): value is Record<string, unknown> {
  if (typeof value !== "object" || value === null || Array.isArray(value)) return false;
  const found = Object.keys(value);
  return (
    keys.length === 0 || (found.length === keys.length && keys.every((key) => Object.hasOwn(value, key)))
  );
}

/** Whether the value is a list of names, no two the same. */
function areNames(value: unknown): value is readonly string[] {
  return (
    Array.isArray(value) &&
    value.length <= MOST_NAMES &&
    value.every((name) => typeof name === "string" && name !== "") &&
    new Set(value).size === value.length
  );
}
