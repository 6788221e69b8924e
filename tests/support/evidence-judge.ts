/**
 * Whether evidence is right, by the meaning of its words. It shares nothing with the checker but the format: truth is
 * evaluated by nested loops, on infinite carriers as `infinite-judge.ts` does; what follows from what is tried on relations
 * on up to 3 points and on the infinite structures of the evidence.
 */

import type {
  AtomRecord,
  ClauseRecord,
  Evidence,
  Fact,
  FormulaRecord,
  NoFiniteModelFact,
  StructureRecord,
  TermFormulaRecord,
  TermRecord,
  TermsFact,
  TheoryRecord,
} from "../../lib/evidence/format.ts";
import { obligationsOf } from "../../lib/logic/records/finiteness.ts";
import { isTrueInfinite, mayBeCertified, sizeOf } from "./infinite-judge.ts";

/** Points are 0, …, size − 1. */
export interface Interpretation {
  readonly size: number;
  readonly holds: (relation: string, points: readonly number[]) => boolean;
  readonly value: (name: string, points: readonly number[]) => number;
}
type Values = Pick<ReadonlyMap<string, number>, "get">;

export function isTrue(
  formula: TermFormulaRecord,
  over: Interpretation,
  values: Values = new Map(),
): boolean {
  const within = (variable: string, body: TermFormulaRecord) => (point: number) =>
    isTrue(body, over, { get: (name) => (name === variable ? point : values.get(name)) });
  const points = () => Array.from({ length: over.size }, (_, point) => point);
  switch (formula[0]) {
    case "true":
      return true;
    case "false":
      return false;
    case "is":
    case "=":
      return isTrueAtom(formula, over, values);
    case "not":
      return !isTrue(formula[1], over, values);
    case "and":
      return (formula.slice(1) as FormulaRecord[]).every((part) => isTrue(part, over, values));
    case "or":
      return (formula.slice(1) as FormulaRecord[]).some((part) => isTrue(part, over, values));
    case "implies":
      return isTrue(formula[1], over, values) ? isTrue(formula[2], over, values) : true;
    case "iff":
      return isTrue(formula[1], over, values) === isTrue(formula[2], over, values);
    case "forall":
      return points().every(within(formula[1], formula[2]));
    case "exists":
      return points().some(within(formula[1], formula[2]));
  }
}

function isTrueAtom(atom: AtomRecord, over: Interpretation, values: Values): boolean {
  const value = (term: TermRecord): number =>
    typeof term === "string"
      ? values.get(term)!
      : over.value(term[0], (term.slice(1) as TermRecord[]).map(value));
  if (atom[0] === "=") return value(atom[1]) === value(atom[2]);
  return over.holds(atom[1], (atom.slice(2) as TermRecord[]).map(value));
}

/** Whether a clause is true for some values of its variables. */
export function isTrueClause(clause: ClauseRecord, over: Interpretation, values: Values): boolean {
  return clause.some((literal) =>
    literal[0] === "not" ? !isTrueAtom(literal[1], over, values) : isTrueAtom(literal, over, values),
  );
}

function noFunctions(name: string): never {
  throw new Error(`${name} has no meaning in a sentence`);
}

/** Truth of a sentence in a structure; false when the structure does not say what its relations are. */
function isTrueIn(record: StructureRecord, sentence: FormulaRecord): boolean {
  if (record.carrier.kind !== "points") return isTrueInfinite(record, sentence);
  const isSaid = (relation: string) => {
    const [, name, places] = /^(.*)\/(\d+)$/s.exec(relation)!;
    return record.tables[name!]?.places === Number(places);
  };
  return (
    relationsOf([sentence]).every(isSaid) && isTrue(sentence, interpretationOf(record, record.carrier.size))
  );
}

function interpretationOf(record: StructureRecord, size: number): Interpretation {
  return {
    size,
    holds: (relation, points) =>
      record.tables[relation]!.holds.includes(points.reduce((kind, point) => kind * size + point, 0)),
    value: noFunctions,
  };
}

/** The relations of sentences, as `name/places`. */
function relationsOf(sentences: readonly FormulaRecord[]): readonly string[] {
  const found = new Set<string>();
  const look = (part: FormulaRecord): void => {
    if (part[0] === "is") found.add(`${part[1]}/${part.length - 2}`);
    else for (const inner of part.slice(1)) if (Array.isArray(inner)) look(inner as unknown as FormulaRecord);
  };
  sentences.forEach(look);
  return [...found].sort();
}

/** Tables beyond which structures are no longer gone through: 2^12 of them are. */
const MOST_CELLS = 12;

/** All interpretations on a number of points; null when there are too many. */
export function interpretationsOn(
  size: number,
  relations: readonly string[],
): readonly Interpretation[] | null {
  let cells = 0;
  const firsts = new Map<string, number>();
  for (const relation of relations) {
    firsts.set(relation, cells);
    cells += size ** Number(relation.slice(relation.lastIndexOf("/") + 1));
  }
  if (cells > MOST_CELLS) return null;
  return Array.from({ length: 2 ** cells }, (_, code) => ({
    size,
    holds: (relation: string, points: readonly number[]) => {
      const first = firsts.get(`${relation}/${points.length}`)!;
      return ((code >> (first + points.reduce((row, point) => row * size + point, 0))) & 1) === 1;
    },
    value: noFunctions,
  }));
}

const known = new Map<string, boolean>();

/** Whether all models of some sentences on up to 3 points make others true, as far as there are not too many. */
export function follows(premises: readonly FormulaRecord[], conclusions: readonly FormulaRecord[]): boolean {
  const key = JSON.stringify([premises, conclusions]);
  let result = known.get(key);
  if (result === undefined) {
    const relations = relationsOf([...premises, ...conclusions]);
    result = [1, 2, 3].every((size) =>
      (interpretationsOn(size, relations) ?? []).every(
        (over) =>
          !premises.every((premise) => isTrue(premise, over)) ||
          conclusions.every((conclusion) => isTrue(conclusion, over)),
      ),
    );
    known.set(key, result);
  }
  return result;
}

/** Whether sentences have a model on so many points; false when there is too much to go through. */
function hasModel(sentences: readonly FormulaRecord[], size: number): boolean {
  const all = interpretationsOn(size, relationsOf(sentences)) ?? [];
  return all.some((over) => sentences.every((sentence) => isTrue(sentence, over)));
}

/** Whether sentences have no model on up to 3 points, as far as there is not too much to go through. */
function haveNoSmallModel(sentences: readonly FormulaRecord[]): boolean {
  return follows(sentences, [["false"]]);
}

/** What a fact says of a structure. */
interface Model {
  /** Null for infinitely many elements. */
  readonly size: number | null;
  /** Whether all axioms of a theory are true in it. */
  readonly has: (theory: TheoryRecord) => boolean;
  /** Whether some axiom of a theory is false in it. */
  readonly lacks: (theory: TheoryRecord) => boolean;
}

/**
 * Whether all facts are true and the verdict is one that is true and that they can show.
 * @param others infinite structures besides those of the evidence in which what is derived must be so
 */
export function isRight(
  { sentences, question, verdict, facts }: Evidence,
  others: readonly StructureRecord[] = [],
): boolean {
  const at = (theory: TheoryRecord) => theory.map((index) => sentences[index]!);
  const structures = facts.flatMap((fact) => (fact.fact === "structure" ? [fact.structure] : []));
  const isModel = (record: StructureRecord, theory: TheoryRecord) =>
    at(theory).every((sentence) => isTrueIn(record, sentence));
  const contains = (larger: TheoryRecord, smaller: TheoryRecord) =>
    smaller.every((index) => larger.includes(index));
  const models = facts.flatMap((fact): readonly Model[] => {
    if (fact.fact === "structure") {
      const has = (theory: TheoryRecord) => isModel(fact.structure, theory);
      return [{ size: sizeOf(fact.structure.carrier), has, lacks: (theory) => !has(theory) }];
    }
    if (fact.fact !== "terms") return [];
    // What else is true there is not decided.
    const has = (theory: TheoryRecord) => contains(fact.holds, theory);
    return [{ size: null, has, lacks: (theory) => fact.fails !== null && contains(theory, fact.fails) }];
  });
  const separated = (first: TheoryRecord, second: TheoryRecord) =>
    models.some(({ has, lacks }) => has(first) && lacks(second));
  const infinite = [...structures, ...others].filter(({ carrier }) => sizeOf(carrier) === null);
  /** Besides, what a derivation shows must be so in every infinite structure that is there. */
  const isConsequence = (premises: TheoryRecord, conclusions: readonly FormulaRecord[]) =>
    follows(at(premises), conclusions) &&
    infinite.every(
      (record) =>
        !isModel(record, premises) || conclusions.every((conclusion) => isTrueIn(record, conclusion)),
    );
  const isDerived = (premises: TheoryRecord, conclusion: number | null) =>
    facts.some(
      (fact) =>
        fact.fact === "derivation" &&
        (fact.conclusion === null || fact.conclusion === conclusion) &&
        contains(premises, fact.premises),
    );
  const entailed = (first: TheoryRecord, second: TheoryRecord) =>
    isConsequence(first, at(second)) &&
    second.every((axiom) => first.includes(axiom) || isDerived(first, axiom));
  const contradictory = (theory: TheoryRecord) =>
    isConsequence(theory, [["false"]]) && isDerived(theory, null);
  const without = (axioms: TheoryRecord, place: number) => axioms.filter((_, index) => index !== place);
  return facts.every(isFactTrue) && isVerdictRight();

  function isFactTrue(fact: Fact): boolean {
    switch (fact.fact) {
      case "derivation":
        return isConsequence(fact.premises, fact.conclusion === null ? [["false"]] : at([fact.conclusion]));
      case "no-model":
        return !hasModel(at(fact.axioms), fact.size);
      case "no-finite-model":
        return isReasonRight(fact);
      case "structure":
        return (
          isModel(fact.structure, fact.holds) && (fact.fails === null || !isModel(fact.structure, fact.fails))
        );
      case "terms":
        return areCertificatesRight(fact);
    }
  }

  /** What a principle asks for has no small model, nor do the axioms; and it is true in every infinite model of them. */
  function isReasonRight({ axioms, principle }: NoFiniteModelFact): boolean {
    const obligations = obligationsOf(principle);
    return (
      obligations !== null &&
      haveNoSmallModel(obligations) &&
      haveNoSmallModel(at(axioms)) &&
      infinite.every(
        (record) =>
          !isModel(record, axioms) || obligations.every((obligation) => isTrueIn(record, obligation)),
      )
    );
  }

  function areCertificatesRight({ terms, holds, fails, certificates }: TermsFact): boolean {
    const shown = at(holds);
    if (fails?.length === 0) return false;
    if (fails !== null) {
      const negated = at(fails).map((sentence): FormulaRecord => ["not", sentence]);
      shown.push(negated.length === 1 ? negated[0]! : ["or", ...negated]);
    }
    return (
      shown.length === certificates.length &&
      shown.every((sentence, place) => mayBeCertified(terms, sentence, certificates[place]!))
    );
  }

  function isVerdictRight(): boolean {
    switch (question.ask) {
      case "entails":
        return verdict === "holds"
          ? entailed(question.premises, [question.conclusion])
          : verdict === "fails" && separated(question.premises, [question.conclusion]);
      case "does-not-entail":
        return verdict === "fails"
          ? entailed(question.premises, [question.conclusion])
          : verdict === "holds" && separated(question.premises, [question.conclusion]);
      case "consistent":
      case "check-finite":
      case "infinite-only":
      case "no-finite-model": {
        const { axioms, ask } = question;
        const model = models.some(({ has }) => has(axioms));
        const finite = models.some(({ has, size }) => size !== null && has(axioms));
        const none = contradictory(axioms);
        const excluded =
          haveNoSmallModel(at(axioms)) &&
          facts.some((fact) => fact.fact === "no-finite-model" && contains(axioms, fact.axioms));
        const right: Readonly<Record<string, Readonly<Record<string, boolean>>>> = {
          consistent: { holds: model, fails: none },
          "check-finite": {
            ...{ finite, inconsistent: none, consistent: model },
            ...{ "infinite-only": model && excluded, "no-finite-model": excluded },
          },
          "infinite-only": { holds: model && excluded, fails: finite || none },
          "no-finite-model": { holds: none || excluded, fails: finite },
        };
        return right[ask]![verdict as string] === true;
      }
      case "equivalent":
        return isWordRight(verdict === "holds" ? "equivalent" : "different", question.left, question.right);
      case "weaker":
        return verdict === "holds"
          ? isWordRight("weaker", question.left, question.right)
          : separated(question.right, question.left) || entailed(question.left, question.right);
      case "independent":
        return verdict === "holds"
          ? question.axioms.every((axiom, place) => separated(without(question.axioms, place), [axiom]))
          : question.axioms.some((axiom, place) => entailed(without(question.axioms, place), [axiom]));
      case "independence":
        return (verdict as string[]).every((word, place) => {
          const rest = without(question.axioms, place);
          const axiom = question.axioms[place]!;
          if (word === "independent") return separated(rest, [axiom]);
          return word === "open" || (word === "redundant" && entailed(rest, [axiom]));
        });
      case "true-in":
      case "false-in": {
        const value = isModel(question.structure, [question.sentence]);
        return verdict === (value === (question.ask === "true-in") ? "holds" : "fails");
      }
      case "models":
        return verdict === null && models.every(({ has }) => has(question.axioms));
      case "minimise":
        return isMinimiseRight(question.axioms, verdict as string[]);
      case "compare":
      case "dualise": {
        const pairs = question.theories.flatMap((left, i) =>
          question.theories.slice(i + 1).map((right) => [left, right] as const),
        );
        return (
          pairs.length === verdict!.length &&
          pairs.every(([left, right], place) => isWordRight(verdict![place]!, left, right))
        );
      }
    }
  }

  function isWordRight(word: string, left: TheoryRecord, right: TheoryRecord): boolean {
    switch (word) {
      case "equivalent":
        return entailed(left, right) && entailed(right, left);
      case "stronger":
        return entailed(left, right) && separated(right, left);
      case "weaker":
        return entailed(right, left) && separated(left, right);
      case "incomparable":
        return separated(left, right) && separated(right, left);
      case "different":
        return separated(left, right) || separated(right, left);
      case "at-least-as-strong":
        return entailed(left, right);
      case "at-most-as-strong":
        return entailed(right, left);
      default:
        return word === "open";
    }
  }

  function isMinimiseRight(axioms: TheoryRecord, words: readonly string[]): boolean {
    const theory = (places: readonly number[]) => places.map((place) => axioms[place]!);
    const sets = words
      .filter((word) => word !== "complete")
      .map((word) => (word === "" ? [] : word.split(",").map(Number)));
    const isComplete = words.includes("complete");
    const subsets = Array.from({ length: 2 ** axioms.length }, (_, code) =>
      [...axioms.keys()].filter((place) => (code >> place) & 1),
    );
    return (
      sets.every(
        (set) =>
          entailed(theory(set), axioms) &&
          set.every((place) => separated(theory(set.filter((other) => other !== place)), theory([place]))),
      ) &&
      (!isComplete ||
        subsets.every(
          (subset) =>
            sets.some((set) => set.every((place) => subset.includes(place))) ||
            separated(theory(subset), axioms),
        ))
    );
  }
}
