/** A drawn sample of a structure of free terms: its smallest terms, and the relation between them. */
import type { TermsRecord } from "../../lib/carriers/free-terms.ts";
import { printTerm } from "../../lib/language/printer.ts";
import { partsOf, type TermFormulaRecord, type TermRecord } from "../../lib/logic/records/formulas.ts";
import { describeTerms } from "../../lib/structures/free-terms/describe.ts";
import type { PictureBlock } from "./blocks.ts";
import type { Matrix } from "./order.ts";
import { type PointLabel, styles } from "./styles.ts";
import { renderPicture } from "./svg.ts";
import { termOfRecord } from "./term-records.ts";
import { enumerate } from "./text.ts";

/** Terms of a sample. */
const SAMPLED = 5;
const LETTERS = "abcdeghijklmnopq";
/** Steps of recursion that a picture may cost. */
const MOST_CALLS = 50_000;

/** Ways of drawing that leave nothing out: of terms that are not drawn nothing is known. */
const PLAIN = styles.filter(({ name }) => name === "upward" || name === "functional" || name === "arrows");

/** @returns null unless there is one relation, of two places, which is easily worked out */
export function drawTerms(record: TermsRecord): PictureBlock | null {
  const [only, ...rest] = Object.entries(record.relations);
  if (only === undefined || rest.length > 0 || only[1].others.length !== 1) return null;
  const [name] = only;
  const terms = smallestTerms(record, SAMPLED);
  const truth = new Recursion(record);
  let matrix: Matrix;
  try {
    matrix = terms.map((first) =>
      terms.map((second) => truth.isTrue(["is", name, first, second], NO_VALUES)),
    );
  } catch (problem) {
    if (problem instanceof TooLong) return null;
    throw problem;
  }
  const letters = [...LETTERS].filter((letter) => !Object.hasOwn(record.constructors, letter));
  const names = terms.map((_, place) => letters[place]!);
  const labels = names.map((one): PointLabel => [one]);
  const style = PLAIN.find(({ fits }) => fits(matrix, false))!;
  const legend = terms.map((term, place) => `${names[place]} = ${printTerm(termOfRecord(term), "unicode")}`);
  const caption = `a sample: ${terms.length} of infinitely many elements; ${legend.join(", ")}; ${style.explain(name, [matrix])}`;
  const pairs = matrix.flatMap((row, i) =>
    row.flatMap((holds, j) => (holds ? [`(${names[i]},${names[j]})`] : [])),
  );
  return {
    kind: "picture",
    svg: renderPicture({ ...style.plan(matrix, labels, name), legend: [] }),
    alt: `Drawing of ${terms.length} of infinitely many elements. Among them ${name} holds of ${
      pairs.length === 0 ? "nothing" : enumerate(pairs)
    }. Drawn: ${caption}.`,
    caption,
  };
}

/** Ground terms by the number of constructors in them, so many. */
function smallestTerms(record: TermsRecord, count: number): readonly TermRecord[] {
  const { constructors } = describeTerms(record);
  const bySize: TermRecord[][] = [[]];
  const all = () => bySize.flat();
  for (let size = 1; all().length < count; size += 1) {
    const found: TermRecord[] = [];
    for (const [name, ...args] of constructors as readonly (readonly [string, ...string[]])[])
      for (const sizes of splits(size - 1, args.length))
        for (const parts of product(sizes.map((one) => bySize[one]!))) found.push([name, ...parts]);
    bySize.push(found);
  }
  return all().slice(0, count);
}

/** All ways to write a number as a sum of so many positive ones, in order. */
function splits(sum: number, count: number): readonly (readonly number[])[] {
  if (count === 0) return sum === 0 ? [[]] : [];
  return Array.from({ length: Math.max(0, sum - count + 1) }, (_, index) => index + 1).flatMap((first) =>
    splits(sum - first, count - 1).map((rest) => [first, ...rest]),
  );
}

function product<Member>(lists: readonly (readonly Member[])[]): readonly (readonly Member[])[] {
  return lists.reduce<readonly (readonly Member[])[]>(
    (tuples, list) => tuples.flatMap((tuple) => list.map((member) => [...tuple, member])),
    [[]],
  );
}

type Values = ReadonlyMap<string, TermRecord>;
const NO_VALUES: Values = new Map();

class TooLong extends Error {}

/** Truth of formulas without quantifiers about ground terms, by the recursion of the relations. */
class Recursion {
  readonly #record: TermsRecord;
  #calls = 0;

  constructor(record: TermsRecord) {
    this.#record = record;
  }

  isTrue(formula: TermFormulaRecord, values: Values): boolean {
    this.#calls += 1;
    if (this.#calls > MOST_CALLS) throw new TooLong();
    switch (formula[0]) {
      case "true":
        return true;
      case "false":
        return false;
      case "=":
        return JSON.stringify(valueAt(formula[1], values)) === JSON.stringify(valueAt(formula[2], values));
      case "is":
        return this.#holds(
          formula[1],
          (formula.slice(2) as TermRecord[]).map((term) => valueAt(term, values)),
        );
      case "not":
        return !this.isTrue(formula[1], values);
      case "and":
        return partsOf(formula).every((part) => this.isTrue(part, values));
      case "or":
        return partsOf(formula).some((part) => this.isTrue(part, values));
      case "implies":
        return !this.isTrue(formula[1], values) || this.isTrue(formula[2], values);
      case "iff":
        return this.isTrue(formula[1], values) === this.isTrue(formula[2], values);
      case "forall":
      case "exists":
        throw new Error("a quantifier in a definition by recursion");
    }
  }

  #holds(name: string, args: readonly TermRecord[]): boolean {
    const { on, others, cases } = this.#record.relations[name]!;
    const [symbol, ...parts] = args[on] as readonly [string, ...TermRecord[]];
    const values = new Map<string, TermRecord>();
    for (const [place, variable] of others.entries())
      values.set(variable, args[place < on ? place : place + 1]!);
    for (const [place, variable] of this.#record.constructors[symbol]!.entries())
      values.set(variable, parts[place]!);
    return this.isTrue(cases[symbol]!, values);
  }
}

function valueAt(term: TermRecord, values: Values): TermRecord {
  if (typeof term === "string") return values.get(term)!;
  const [name, ...args] = term;
  return [name, ...args.map((arg) => valueAt(arg, values))];
}
