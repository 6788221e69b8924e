/** The search for certificates of sentences about free terms, of growing size. */
import type { CertificateRecord, TermsRecord } from "../../carriers/free-terms.ts";
import { type Claim, FreeTerms } from "../../carriers/free-terms-check.ts";
import {
  atomTerms,
  type FormulaRecord,
  freeVariables,
  type Growth,
  partsOf,
  type TermFormulaRecord,
  type TermRecord,
  termVariables,
  visitAtoms,
} from "../../logic/records/formulas.ts";

/** What it costs to tell the constructors of a parameter apart, as many as the symbols of a term. */
const COST_OF_CASES = 3;

/** Instances that are tried at once. */
const MOST_INSTANCES = 12;

/** Certificates for one structure. */
export class CertificateSearch {
  readonly #terms: FreeTerms;
  readonly #constructors: readonly (readonly [string, number])[];
  readonly #growth: Growth;

  /** @param growth counts all parts of formulas that are looked at */
  constructor(record: TermsRecord, growth: Growth) {
    this.#terms = new FreeTerms(record, growth);
    this.#constructors = Object.entries(record.constructors).map(([name, { length }]) => [name, length]);
    this.#growth = growth;
  }

  /**
   * A certificate for the sentence.
   * @param size how many symbols its terms may have together, counting cases as some
   */
  find(sentence: FormulaRecord, size: number): CertificateRecord | null {
    if (!this.#terms.interprets(sentence)) return null;
    return this.#refute(this.#terms.negation(sentence), size);
  }

  #refute(claim: Claim, left: number): CertificateRecord | null {
    const { formula } = claim;
    if (formula[0] === "false") return [];
    const parameters = [...freeVariables(formula)].sort((a, b) => Number(a) - Number(b));
    if (!hasQuantifier(formula)) {
      if (this.#terms.isRefuted(claim)) return [];
    } else {
      const atOnce = this.#refuteAtOnce(claim, parameters);
      if (atOnce !== null) return atOnce;
      for (const [size, term] of this.#termsOf(parameters, left)) {
        const rest = this.#refute(this.#terms.instances(claim, [term])!, left - size);
        if (rest !== null) return [["instances", term], ...rest];
      }
    }
    if (left < COST_OF_CASES) return null;
    for (const parameter of parameters) {
      for (const kind of ["cases", "induction"] as const) {
        const branches = this.#branches(claim, parameter, kind === "induction", left - COST_OF_CASES);
        if (branches !== null) return [[kind, parameter, branches]];
      }
    }
    return null;
  }

  /** When the first ∀ is innermost: its instances at all parameters, constants and terms that occur, as many as needed. */
  #refuteAtOnce(claim: Claim, parameters: readonly string[]): CertificateRecord | null {
    const inner = firstForall(claim.formula);
    if (inner === null || hasQuantifier(inner[2])) return null;
    const found = new Map<string, TermRecord>(parameters.map((name) => [name, name]));
    const add = (term: TermRecord) => {
      if (found.size < MOST_INSTANCES && termVariables(term).every((name) => parameters.includes(name)))
        found.set(JSON.stringify(term), term);
    };
    for (const [symbol, places] of this.#constructors) if (places === 0) add([symbol]);
    visitAtoms(claim.formula, this.#growth, (atom) => atomTerms(atom).forEach(add));
    const refutes = (terms: readonly TermRecord[]) =>
      this.#terms.isRefuted(this.#terms.instances(claim, terms)!);
    let terms: readonly TermRecord[] = [...found.values()];
    if (!refutes(terms)) return null;
    for (const term of [...terms].reverse()) {
      const fewer = terms.filter((other) => other !== term);
      if (refutes(fewer)) terms = fewer;
    }
    return [["instances", ...terms]];
  }

  #branches(
    claim: Claim,
    parameter: string,
    isInductive: boolean,
    left: number,
  ): Readonly<Record<string, CertificateRecord>> | null {
    const found: [string, CertificateRecord][] = [];
    for (const [symbol, branch] of this.#terms.branches(claim, parameter, isInductive)!) {
      const steps = this.#refute(branch, left);
      if (steps === null) return null;
      found.push([symbol, steps]);
    }
    return Object.fromEntries(found);
  }

  /** The terms with the parameters that have at most so many symbols, the smallest first; each with that number. */
  *#termsOf(parameters: readonly string[], most: number): Generator<readonly [number, TermRecord]> {
    const bySize: TermRecord[][] = [[]];
    for (let size = 1; size <= most; size += 1) {
      const terms: TermRecord[] = size === 1 ? [...parameters] : [];
      for (const [symbol, places] of this.#constructors)
        for (const args of this.#listsOf(bySize, places, size - 1)) terms.push([symbol, ...args]);
      for (const term of terms) yield [size, term];
      bySize.push(terms);
    }
  }

  /** The lists of so many terms that have so many symbols together. */
  #listsOf(
    bySize: readonly (readonly TermRecord[])[],
    count: number,
    size: number,
  ): readonly (readonly TermRecord[])[] {
    if (count === 0) return size === 0 ? [[]] : [];
    const lists: TermRecord[][] = [];
    for (let first = 1; first <= size - (count - 1); first += 1) {
      for (const rest of this.#listsOf(bySize, count - 1, size - first)) {
        // Counted before they are made: there may be very many.
        this.#growth.add(bySize[first]!.length);
        for (const term of bySize[first]!) lists.push([term, ...rest]);
      }
    }
    return lists;
  }
}

/** The first ∀ outside of other quantifiers. */
function firstForall(
  formula: TermFormulaRecord,
): readonly ["forall" | "exists", string, TermFormulaRecord] | null {
  if (formula[0] === "forall" || formula[0] === "exists") return formula;
  for (const part of partsOf(formula)) {
    const found = firstForall(part);
    if (found !== null) return found;
  }
  return null;
}

function hasQuantifier(formula: TermFormulaRecord): boolean {
  return formula[0] === "forall" || formula[0] === "exists" || partsOf(formula).some(hasQuantifier);
}
