/**
 * Truth in structures of free terms, by definition: relations are worked out at ground terms, and quantifiers range over
 * finitely many of them. It shares nothing with the checker of certificates but the format.
 */
import type { CertificateRecord, TermsRecord } from "../../lib/carriers/free-terms.ts";
import type { FormulaRecord, TermFormulaRecord, TermRecord } from "../../lib/logic/records/formulas.ts";

export type Ground = readonly [string, ...Ground[]];
type Values = Readonly<Record<string, Ground>>;
/** What ∀ and ∃ range over. */
export interface Ranges {
  readonly every: readonly Ground[];
  readonly some: readonly Ground[];
}

const NO_RANGES: Ranges = { every: [], some: [] };
const textOf = (term: Ground) => JSON.stringify(term);

export function groundValue(term: TermRecord, values: Values): Ground {
  if (typeof term === "string") return values[term]!;
  return [term[0], ...(term.slice(1) as TermRecord[]).map((arg) => groundValue(arg, values))];
}

export class GroundTerms {
  readonly #record: TermsRecord;
  readonly #facts = new Map<string, boolean>();

  constructor(record: TermsRecord) {
    this.#record = record;
  }

  /** Whether a relation holds of ground terms. */
  holds(name: string, terms: readonly Ground[]): boolean {
    const key = JSON.stringify([name, terms]);
    const known = this.#facts.get(key);
    if (known !== undefined) return known;
    const { on, others, cases } = this.#record.relations[name]!;
    const [symbol, ...args] = terms[on]!;
    const values: Record<string, Ground> = {};
    this.#record.constructors[symbol]!.forEach((arg, place) => {
      values[arg] = args[place]!;
    });
    let next = 0;
    for (const [place, term] of terms.entries()) {
      if (place === on) continue;
      values[others[next]!] = term;
      next += 1;
    }
    const result = this.isTrue(cases[symbol]!, NO_RANGES, values);
    this.#facts.set(key, result);
    return result;
  }

  isTrue(formula: TermFormulaRecord, ranges: Ranges, values: Values = {}): boolean {
    return this.#is(formula, true, ranges, values);
  }

  /** Whether the formula has the truth value. What must be so of all ranges over `every`, what of some over `some`. */
  #is(formula: TermFormulaRecord, wanted: boolean, ranges: Ranges, values: Values): boolean {
    const part = (inner: TermFormulaRecord, truth = wanted) => this.#is(inner, truth, ranges, values);
    switch (formula[0]) {
      case "true":
        return wanted;
      case "false":
        return !wanted;
      case "=":
        return (
          (textOf(groundValue(formula[1], values)) === textOf(groundValue(formula[2], values))) === wanted
        );
      case "is": {
        const terms = (formula.slice(2) as TermRecord[]).map((term) => groundValue(term, values));
        return this.holds(formula[1], terms) === wanted;
      }
      case "not":
        return part(formula[1], !wanted);
      case "and":
      case "or": {
        const parts = formula.slice(1) as TermFormulaRecord[];
        const needsAll = (formula[0] === "and") === wanted;
        return needsAll ? parts.every((one) => part(one)) : parts.some((one) => part(one));
      }
      case "implies":
        return wanted
          ? part(formula[1], false) || part(formula[2], true)
          : part(formula[1], true) && part(formula[2], false);
      case "iff":
        return wanted
          ? (part(formula[1], true) && part(formula[2], true)) ||
              (part(formula[1], false) && part(formula[2], false))
          : (part(formula[1], true) && part(formula[2], false)) ||
              (part(formula[1], false) && part(formula[2], true));
      case "forall":
      case "exists": {
        const [kind, variable, body] = formula;
        const check = (term: Ground) => this.#is(body, wanted, ranges, { ...values, [variable]: term });
        return (kind === "forall") === wanted ? ranges.every.every(check) : ranges.some.some(check);
      }
    }
  }
}

/** The first ground terms, small ones first; with each its arguments. */
export function groundTerms({ constructors }: TermsRecord, count: number): readonly Ground[] {
  const found = new Map<string, Ground>();
  for (let round = 0; found.size < count && round < 100; round += 1) {
    const before = [...found.values()];
    for (const [symbol, args] of Object.entries(constructors)) {
      const lists = args.reduce<Ground[][]>(
        (all) => all.flatMap((list) => before.map((term) => [...list, term])),
        [[]],
      );
      for (const list of lists)
        if (found.size < count) found.set(textOf([symbol, ...list]), [symbol, ...list]);
    }
  }
  return [...found.values()];
}

/** Whether a certificate may name elements that are only said to exist, by a hypothesis of an induction. */
export function takesWitnessesFromHypotheses(certificate: CertificateRecord): boolean {
  const text = JSON.stringify(certificate);
  return text.includes('["induction"') && text.includes('["instances"');
}

/** The values of the terms of a certificate when its parameters are among the given terms, and those terms. */
export function namedBy(certificate: CertificateRecord, every: readonly Ground[]): readonly Ground[] {
  const found = new Map(every.map((term) => [textOf(term), term]));
  const add = (term: TermRecord): void => {
    const variables = [...new Set(variablesOf(term))];
    const all = variables.reduce<Values[]>(
      (values, name) => values.flatMap((value) => every.map((ground) => ({ ...value, [name]: ground }))),
      [{}],
    );
    for (const values of all) {
      const value = groundValue(term, values);
      found.set(textOf(value), value);
    }
  };
  const read = (steps: CertificateRecord): void => {
    for (const step of steps) {
      if (step[0] === "instances") (step.slice(1) as TermRecord[]).forEach(add);
      else Object.values(step[2]).forEach(read);
    }
  };
  read(certificate);
  return [...found.values()];
}

function variablesOf(term: TermRecord): string[] {
  return typeof term === "string" ? [term] : (term.slice(1) as TermRecord[]).flatMap(variablesOf);
}

/** Whether the value is a closed formula whose terms are variables: what the reader of evidence lets through. */
export function isSentence(value: unknown, scope: readonly string[] = []): value is FormulaRecord {
  if (!Array.isArray(value)) return false;
  const [kind, ...rest] = value as unknown[];
  const inScope = (name: unknown) => typeof name === "string" && name !== "" && scope.includes(name);
  const part = (one: unknown) => isSentence(one, scope);
  switch (kind) {
    case "true":
    case "false":
      return rest.length === 0;
    case "=":
      return rest.length === 2 && rest.every(inScope);
    case "is":
      return rest.length > 1 && typeof rest[0] === "string" && rest[0] !== "" && rest.slice(1).every(inScope);
    case "not":
      return rest.length === 1 && rest.every(part);
    case "and":
    case "or":
      return rest.length > 1 && rest.every(part);
    case "implies":
    case "iff":
      return rest.length === 2 && rest.every(part);
    case "forall":
    case "exists":
      return (
        rest.length === 2 &&
        typeof rest[0] === "string" &&
        rest[0] !== "" &&
        isSentence(rest[1], [...scope, rest[0]])
      );
    default:
      return false;
  }
}

/** Whether what is certified passes for true when ∀ ranges over a few ground terms, ∃ over what the certificate names. */
export function passes(
  record: TermsRecord,
  sentence: FormulaRecord,
  certificate: CertificateRecord,
  count = 4,
): boolean {
  const every = groundTerms(record, count);
  return new GroundTerms(record).isTrue(sentence, { every, some: namedBy(certificate, every) });
}
