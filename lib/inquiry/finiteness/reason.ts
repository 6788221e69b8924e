/** A reason why a theory has no finite model: a principle, with its formulas, and what it asks the theory for. */
import {
  and,
  atom,
  exists,
  type Formula,
  forall,
  iff,
  implies,
  not,
  or,
  type RelationSymbol,
  type Variable,
} from "../../logic/formula.ts";
import {
  type CountingRecord,
  type EndlessOrderRecord,
  type ObligationKind,
  obligationRecordsOf,
  type PairsRecord,
  type PrincipleRecord,
} from "../../logic/records/finiteness.ts";
import { type FormulaRecord, partsOf, recordFormula } from "../../logic/records/formulas.ts";

/** A principle as evidence has it, and the formulas that it was made of. */
export interface FinitenessReason {
  readonly record: PrincipleRecord;
  readonly parameters: readonly Variable[];
  /** Null just when there are no parameters. */
  readonly given: Formula | null;
  /** ⊤ where all elements are looked at. */
  readonly domain: Formula;
  readonly relation: Formula;
}

/** What a reason asks the theory for. */
export interface Obligation {
  readonly formula: Formula;
  readonly kind: ObligationKind;
  /** What it says, for people: "it is transitive there". */
  readonly role: string;
}

export type Different = CountingRecord["different"];

/** What sets principles apart, and what they have besides their formulas. */
export type PrincipleShape =
  | Pick<EndlessOrderRecord, "principle" | "everywhere">
  | Pick<CountingRecord, "principle" | "successors" | "predecessors" | "spare" | "everywhere" | "different">
  | Pick<PairsRecord, "principle" | "pairs" | "different">
  | { readonly principle: "comprehension"; readonly different: Different };

/** The formulas of a principle. */
export interface ReasonParts {
  readonly domain: Formula;
  readonly relation: Formula;
  /** Null for none. */
  readonly witness: Witness | null;
}

/** Elements that a theory says exist. */
export interface Witness {
  readonly parameters: readonly Variable[];
  readonly given: Formula;
}

export function reasonOf(
  shape: PrincipleShape,
  { domain, relation, witness }: ReasonParts,
): FinitenessReason {
  const [parameters, given] = [witness?.parameters ?? [], witness?.given ?? null];
  const record: PrincipleRecord = {
    ...shape,
    parameters,
    given: given === null ? null : recordFormula(given),
    domain: recordFormula(domain),
    relation: recordFormula(relation),
  };
  return { record, parameters, given, domain, relation };
}

/**
 * What a reason asks for, in the order of its principle; null when the principle refuses it.
 * @param symbols those of all its formulas
 */
export function obligationsFor(
  { record }: FinitenessReason,
  symbols: ReadonlyMap<string, RelationSymbol>,
): readonly Obligation[] | null {
  const obligations = obligationRecordsOf(record);
  if (obligations === null) return null;
  return obligations.map(({ kind, sentence }) => ({
    formula: formulaOf(sentence, symbols),
    kind,
    role: roleOf(record, kind),
  }));
}

function roleOf(record: PrincipleRecord, kind: ObligationKind): string {
  const there = record.domain[0] === "true" ? "" : " there";
  const anywhere = "everywhere" in record && record.everywhere ? "" : there;
  switch (kind) {
    case "parameters":
      return record.parameters.length === 1 ? "there is such an element" : "there are such elements";
    case "irreflexive":
      return `it is irreflexive${anywhere}`;
    case "transitive":
      return `it is transitive${anywhere}`;
    case "size":
      return record.principle === "pairs"
        ? `there are at least ${record.pairs + 1} elements${there}`
        : "there is an element there";
    case "successors": {
      const count = record.principle === "counting" ? record.successors : 1;
      return `every element${there} has at least ${count} successor${plural(count)}${there}`;
    }
    case "predecessors": {
      if (record.principle === "pairs")
        return `every element${there} stands for at most ${pairs(record.pairs)}`;
      const count = (record as CountingRecord).predecessors;
      return `every element${anywhere} has at most ${count} predecessor${plural(count)}${anywhere}`;
    }
    case "spare": {
      if (record.principle === "comprehension") return `some element${there} has no predecessors${there}`;
      const { spare, successors } = record as CountingRecord;
      if (spare === "more-successors")
        return `some element${there} has at least ${successors + 1} successors${there}`;
      return successors === 1
        ? `some element${there} has no predecessor${there}`
        : `some element${there} has at most ${successors - 1} predecessor${plural(successors - 1)}${there}`;
    }
    case "values":
      return record.principle === "pairs"
        ? `some element${there} stands for each pair of elements${there}`
        : `for all x and y${there}, some element has the predecessors of x and y itself${there}`;
  }
}

function plural(count: number): string {
  return count === 1 ? "" : "s";
}

function pairs(count: number): string {
  return count === 1 ? "one pair" : `${count} pairs`;
}

/**
 * The formula that a record is of.
 * @param symbols by name, all its relations
 */
export function formulaOf(record: FormulaRecord, symbols: ReadonlyMap<string, RelationSymbol>): Formula {
  const part = (inner: FormulaRecord) => formulaOf(inner, symbols);
  switch (record[0]) {
    case "is":
      return atom(symbols.get(record[1])!, ...(record.slice(2) as Variable[]));
    case "=":
      return { kind: "equal", left: record[1] as Variable, right: record[2] as Variable };
    case "true":
    case "false":
      return { kind: record[0] };
    case "not":
      return not(part(record[1]));
    case "and":
      return and(...partsOf(record).map(part));
    case "or":
      return or(...partsOf(record).map(part));
    case "implies":
      return implies(part(record[1]), part(record[2]));
    case "iff":
      return iff(part(record[1]), part(record[2]));
    case "forall":
      return forall(record[1], part(record[2]));
    case "exists":
      return exists(record[1], part(record[2]));
  }
}
