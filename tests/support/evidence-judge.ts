/**
 * Whether evidence is right, by the meaning of its words on small structures. It shares nothing with the checker but the
 * format: truth is evaluated by nested loops, and what follows from what is tried on relations on up to 3 points.
 */
import type {
  AtomRecord,
  ClauseRecord,
  Evidence,
  FormulaRecord,
  StructureRecord,
  TermFormulaRecord,
  TermRecord,
  TheoryRecord,
} from "../../lib/evidence/format.ts";

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

function interpretationOf(record: StructureRecord): Interpretation {
  const { size } = record.carrier;
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

/** Whether all facts are true and the verdict is one that is true and that they can show. */
export function isRight({ sentences, question, verdict, facts }: Evidence): boolean {
  const at = (theory: TheoryRecord) => theory.map((index) => sentences[index]!);
  const structures = facts.flatMap((fact) => (fact.fact === "structure" ? [fact.structure] : []));
  const isModel = (record: StructureRecord, theory: TheoryRecord) =>
    at(theory).every((sentence) => isTrue(sentence, interpretationOf(record)));
  const separated = (first: TheoryRecord, second: TheoryRecord) =>
    structures.some((record) => isModel(record, first) && !isModel(record, second));
  const entailed = (first: TheoryRecord, second: TheoryRecord) => follows(at(first), at(second));
  const contradictory = (theory: TheoryRecord) => follows(at(theory), [["false"]]);
  const others = (axioms: TheoryRecord, place: number) => axioms.filter((_, index) => index !== place);
  const areFactsTrue = facts.every((fact) => {
    if (fact.fact === "derivation")
      return follows(at(fact.premises), fact.conclusion === null ? [["false"]] : at([fact.conclusion]));
    if (fact.fact === "no-model") return !hasModel(at(fact.axioms), fact.size);
    return (
      isModel(fact.structure, fact.holds) && (fact.fails === null || !isModel(fact.structure, fact.fails))
    );
  });
  return areFactsTrue && isVerdictRight();

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
        const model = structures.some((record) => isModel(record, question.axioms));
        const none = contradictory(question.axioms);
        const right: Readonly<Record<string, Readonly<Record<string, boolean>>>> = {
          consistent: { holds: model, fails: none },
          "check-finite": { finite: model, inconsistent: none },
          "infinite-only": { fails: model || none },
          "no-finite-model": { fails: model, holds: none },
        };
        return right[question.ask]![verdict as string] === true;
      }
      case "equivalent":
        return isWordRight(verdict === "holds" ? "equivalent" : "different", question.left, question.right);
      case "weaker":
        return verdict === "holds"
          ? isWordRight("weaker", question.left, question.right)
          : separated(question.right, question.left) || entailed(question.left, question.right);
      case "independent":
        return verdict === "holds"
          ? question.axioms.every((axiom, place) => separated(others(question.axioms, place), [axiom]))
          : question.axioms.some((axiom, place) => entailed(others(question.axioms, place), [axiom]));
      case "independence":
        return (verdict as string[]).every((word, place) => {
          const rest = others(question.axioms, place);
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
        return verdict === null && structures.every((record) => isModel(record, question.axioms));
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
