/**
 * Truth in structures on infinite carriers and of free terms, for tests of the checker. On lines and what is made of them
 * quantifiers range over true elements, numbers with nothing cut; kinds get their numbers from the carrier's list of
 * examples. On other carriers the searches' evaluator says what is true, which the checker's does not use.
 */
import { buildCarrier } from "../../lib/carriers/build.ts";
import { kindExamplesOf } from "../../lib/carriers/kind-examples.ts";
import type { Structure, Table } from "../../lib/carriers/structure.ts";
import type {
  CertificateRecord,
  FormulaRecord,
  StructureRecord,
  TermFormulaRecord,
  TermsRecord,
} from "../../lib/evidence/format.ts";
import { formulaOf } from "../../lib/inquiry/finiteness/reason.ts";
import type { RelationSymbol } from "../../lib/logic/formula.ts";
import { Meter } from "../../lib/logic/meter.ts";
import type { CarrierDescription } from "../../lib/logic/structure-definition.ts";
import { satisfies } from "../../lib/structures/evaluate.ts";
import {
  type Ground,
  GroundTerms,
  groundTerms,
  passes,
  takesWitnessesFromHypotheses,
} from "./ground-terms.ts";

/** A number, one with a colour, a tuple, or an element of a part or a copy; two are the same just if their JSON is. */
type Element = unknown;

interface TrueModel {
  /** Elements that stand for all others beside those named, with so many still to come. */
  candidates(named: readonly Element[], toCome: number): readonly Element[];
  /** What a table may tell of elements. */
  pattern(elements: readonly Element[]): string;
  /** Elements that stand to each other as a configuration of the carrier says. */
  realise(configuration: never): readonly Element[];
}

const textOf = (value: unknown) => JSON.stringify(value);
const distinct = (elements: readonly Element[]): readonly Element[] => [
  ...new Map(elements.map((one) => [textOf(one), one])).values(),
];
const whole = (from: number, to: number) => Array.from({ length: to - from + 1 }, (_, step) => from + step);

/** The differences of all pairs, those beyond the offset alike. */
function differences(positions: readonly number[], offset: number): string {
  const cut = (difference: number) => Math.max(-offset - 1, Math.min(offset + 1, difference));
  return textOf(positions.map((x) => positions.map((y) => cut(y - x))));
}

/** @returns null for carriers that are not lines or made of lines */
function trueModel(description: CarrierDescription): TrueModel | null {
  switch (description.kind) {
    case "points":
      return {
        candidates: () => whole(0, description.size - 1),
        pattern: textOf,
        realise: (points: readonly number[]) => points,
      };
    case "dense-line":
      return denseLine(description.colours);
    case "integer-line": {
      const { offset } = description;
      return {
        candidates: (named, toCome) => {
          if (named.length === 0) return [0];
          const beyond = 2 ** toCome * (offset + 1);
          return whole(Math.min(...(named as number[])) - beyond, Math.max(...(named as number[])) + beyond);
        },
        pattern: (elements) => differences(elements as number[], offset),
        realise: ({ positions }: { positions: readonly number[] }) => positions,
      };
    }
    case "half-line": {
      const { offset, ends } = description;
      return {
        candidates: (named, toCome) => {
          const beyond = 2 ** toCome * (offset + 1);
          return whole(0, Math.max(ends + beyond, ...(named as number[]).map((one) => one + beyond)));
        },
        pattern: (elements) =>
          `${differences(elements as number[], offset)} ${(elements as number[]).map((one) => Math.min(one, ends))}`,
        realise: ({ positions }: { positions: readonly number[] }) => positions,
      };
    }
    case "tuples": {
      const over = trueModel(description.over);
      return over === null ? null : tuples(over, description.widths);
    }
    case "sum": {
      const parts = description.parts.flatMap((part) => trueModel(part) ?? []);
      return parts.length < description.parts.length ? null : sum(parts);
    }
    case "product": {
      const [outer, inner] = [trueModel(description.outer), trueModel(description.inner)];
      return outer === null || inner === null ? null : product(outer, inner);
    }
    default:
      return null;
  }
}

interface Rational {
  readonly at: number;
  readonly colour: number;
}

function denseLine(colours: number): TrueModel {
  return {
    candidates: (named) => {
      const known = distinct(named) as readonly Rational[];
      const places = known.map(({ at }) => at).sort((a, b) => a - b);
      const between = places.slice(1).map((at, before) => (at + places[before]!) / 2);
      const gaps = places.length === 0 ? [0] : [places[0]! - 1, ...between, places.at(-1)! + 1];
      return [...known, ...gaps.flatMap((at) => whole(0, colours - 1).map((colour) => ({ at, colour })))];
    },
    pattern: (elements) => {
      const numbers = elements as readonly Rational[];
      const order = numbers.map((x) => numbers.map((y) => Math.sign(y.at - x.at)));
      return textOf([order, numbers.map(({ colour }) => colour)]);
    },
    realise: (configuration: { ranks: readonly number[]; colours: readonly number[] }) =>
      configuration.ranks.map((at, place) => ({ at, colour: configuration.colours[place]! })),
  };
}

interface Tuple {
  readonly tag: number;
  readonly coordinates: readonly Element[];
}

function tuples(over: TrueModel, widths: readonly number[]): TrueModel {
  const widest = Math.max(...widths);
  const coordinatesOf = (elements: readonly Element[]) =>
    (elements as readonly Tuple[]).flatMap(({ coordinates }) => coordinates);
  return {
    candidates: (named, toCome) => {
      const before = coordinatesOf(named);
      return widths.flatMap((width, tag) => {
        let all: (readonly Element[])[] = [[]];
        for (let left = width - 1; left >= 0; left -= 1)
          all = all.flatMap((own) =>
            over.candidates([...before, ...own], toCome * widest + left).map((next) => [...own, next]),
          );
        return all.map((coordinates) => ({ tag, coordinates }));
      });
    },
    pattern: (elements) =>
      textOf([(elements as readonly Tuple[]).map(({ tag }) => tag), over.pattern(coordinatesOf(elements))]),
    realise: ({ tags, base }: { tags: readonly number[]; base: unknown }) => {
      const all = [...over.realise(base as never)];
      return tags.map((tag) => ({ tag, coordinates: all.splice(0, widths[tag]) }));
    },
  };
}

interface OfPart {
  readonly part: number;
  readonly element: Element;
}

function sum(parts: readonly TrueModel[]): TrueModel {
  const inside = (elements: readonly Element[], wanted: number) =>
    (elements as readonly OfPart[]).flatMap(({ part, element }) => (part === wanted ? [element] : []));
  return {
    candidates: (named, toCome) =>
      parts.flatMap((model, part) =>
        model.candidates(inside(named, part), toCome).map((element) => ({ part, element })),
      ),
    pattern: (elements) =>
      textOf([
        (elements as readonly OfPart[]).map(({ part }) => part),
        parts.map((model, part) => model.pattern(inside(elements, part))),
      ]),
    realise: (configuration: { parts: readonly number[]; inside: readonly unknown[] }) => {
      const all = parts.map((model, part) => [...model.realise(configuration.inside[part] as never)]);
      return configuration.parts.map((part) => ({ part, element: all[part]!.shift() }));
    },
  };
}

interface OfCopy {
  readonly outer: Element;
  readonly inner: Element;
}

function product(outer: TrueModel, inner: TrueModel): TrueModel {
  const copiesOf = (elements: readonly Element[]) =>
    distinct((elements as readonly OfCopy[]).map((one) => one.outer));
  const inCopy = (elements: readonly Element[], copy: Element) =>
    (elements as readonly OfCopy[]).flatMap((one) => (textOf(one.outer) === textOf(copy) ? [one.inner] : []));
  return {
    candidates: (named, toCome) =>
      outer
        .candidates(copiesOf(named), toCome)
        .flatMap((copy) =>
          inner.candidates(inCopy(named, copy), toCome).map((one) => ({ outer: copy, inner: one })),
        ),
    pattern: (elements) => {
      const copies = copiesOf(elements);
      const names = copies.map(textOf);
      return textOf([
        (elements as readonly OfCopy[]).map((one) => names.indexOf(textOf(one.outer))),
        outer.pattern(copies),
        copies.map((copy) => inner.pattern(inCopy(elements, copy))),
      ]);
    },
    realise: (configuration: { groups: readonly number[]; outer: unknown; inside: readonly unknown[] }) => {
      const copies = outer.realise(configuration.outer as never);
      const all = configuration.inside.map((there) => [...inner.realise(there as never)]);
      return configuration.groups.map((copy) => ({ outer: copies[copy]!, inner: all[copy]!.shift() }));
    },
  };
}

/** How many elements; null for infinitely many. */
export function sizeOf(description: CarrierDescription): number | null {
  const total = (sizes: readonly (number | null)[], join: (one: number, other: number) => number) =>
    sizes.includes(null) ? null : (sizes as number[]).reduce(join);
  switch (description.kind) {
    case "points":
      return description.size;
    case "tuples": {
      const over = sizeOf(description.over);
      const sizes = description.widths.map((width) =>
        width === 0 ? 1 : over === null ? null : over ** width,
      );
      return total(sizes, (one, other) => one + other);
    }
    case "sum":
      return total(description.parts.map(sizeOf), (one, other) => one + other);
    case "product":
      return total([sizeOf(description.outer), sizeOf(description.inner)], (one, other) => one * other);
    default:
      return null;
  }
}

const known = new Map<string, boolean>();

/** Whether a sentence is true in a structure; false when the structure does not say what its relations are. */
export function isTrueInfinite(record: StructureRecord, sentence: FormulaRecord): boolean {
  const key = textOf([record, sentence]);
  let result = known.get(key);
  if (result === undefined) {
    const interprets = relationsIn(sentence).every(
      ([name, places]) => record.tables[name]?.places === places,
    );
    const model = trueModel(record.carrier);
    result =
      interprets && (model === null ? isFoundTrue(record, sentence) : isTrueOver(model, record, sentence));
    known.set(key, result);
  }
  return result;
}

/** The relations of a formula, with their places. */
export function relationsIn(formula: TermFormulaRecord): readonly (readonly [string, number])[] {
  if (formula[0] === "is") return [[formula[1], formula.length - 2]];
  if (formula[0] === "=") return [];
  return formula
    .slice(1)
    .flatMap((part) => (Array.isArray(part) ? relationsIn(part as unknown as FormulaRecord) : []));
}

function isFoundTrue(record: StructureRecord, sentence: FormulaRecord): boolean {
  const carrier = buildCarrier(record.carrier);
  const symbols = new Map<string, RelationSymbol>();
  const tables = new Map<string, Table>();
  for (const [name, { places, holds: kinds }] of Object.entries(record.tables)) {
    const relation = { name, places, infix: false };
    const holds = new Uint8Array(carrier.kindCount(places));
    for (const kind of kinds) holds[kind] = 1;
    symbols.set(name, relation);
    tables.set(name, { relation, holds });
  }
  const structure: Structure = { carrier, tables };
  return satisfies(structure, formulaOf(sentence, symbols), new Meter());
}

function isTrueOver(model: TrueModel, record: StructureRecord, sentence: FormulaRecord): boolean {
  const carrier = buildCarrier(record.carrier);
  const holds = new Map<string, ReadonlySet<string>>();
  for (const [name, table] of Object.entries(record.tables)) {
    const patterns = kindExamplesOf(carrier, table.places).map((example) =>
      model.pattern(model.realise(example as never)),
    );
    if (new Set(patterns).size !== carrier.kindCount(table.places))
      throw new Error(`the kinds of ${textOf(record.carrier)} are not its patterns`);
    holds.set(name, new Set(table.holds.map((kind) => patterns[kind]!)));
  }
  const remembered = new Map<FormulaRecord, Map<string, boolean>>();
  return isTrue(sentence, new Map());

  function isTrue(formula: FormulaRecord, values: ReadonlyMap<string, Element>): boolean {
    const part = (inner: unknown) => isTrue(inner as FormulaRecord, values);
    switch (formula[0]) {
      case "true":
        return true;
      case "false":
        return false;
      case "is":
        return holds
          .get(formula[1])!
          .has(model.pattern(formula.slice(2).map((name) => values.get(name as string))));
      case "=":
        return textOf(values.get(formula[1] as string)) === textOf(values.get(formula[2] as string));
      case "not":
        return !part(formula[1]);
      case "and":
        return formula.slice(1).every(part);
      case "or":
        return formula.slice(1).some(part);
      case "implies":
        return part(formula[1]) ? part(formula[2]) : true;
      case "iff":
        return part(formula[1]) === part(formula[2]);
      case "forall":
      case "exists": {
        const [kind, variable, body] = formula;
        const free = new Map([...values].filter(([name]) => name !== variable && occursFree(name, body)));
        const key = textOf([...free]);
        const results = remembered.get(formula) ?? new Map<string, boolean>();
        remembered.set(formula, results);
        let result = results.get(key);
        if (result === undefined) {
          const check = (element: Element) => isTrue(body, new Map(free).set(variable, element));
          const candidates = model.candidates([...free.values()], depthOf(body));
          result = kind === "forall" ? candidates.every(check) : candidates.some(check);
          results.set(key, result);
        }
        return result;
      }
    }
  }
}

function occursFree(name: string, formula: TermFormulaRecord): boolean {
  if (formula[0] === "is" || formula[0] === "=")
    return formula.slice(formula[0] === "is" ? 2 : 1).includes(name);
  if ((formula[0] === "forall" || formula[0] === "exists") && formula[1] === name) return false;
  return formula
    .slice(1)
    .some((part) => Array.isArray(part) && occursFree(name, part as unknown as FormulaRecord));
}

function depthOf(formula: TermFormulaRecord): number {
  const inner = formula
    .slice(1)
    .map((part) =>
      Array.isArray(part) && formula[0] !== "is" ? depthOf(part as unknown as FormulaRecord) : 0,
    );
  return Math.max(0, ...inner) + (formula[0] === "forall" || formula[0] === "exists" ? 1 : 0);
}

/** Ground terms that quantifiers range over where something is to be refuted. */
const MOST_TERMS = 12;

/**
 * Whether nothing speaks against what a certificate shows: no ground terms refute the sentence, and what the certificate
 * names makes it pass.
 */
export function mayBeCertified(
  terms: TermsRecord,
  sentence: FormulaRecord,
  certificate: CertificateRecord,
): boolean {
  const key = textOf([terms, sentence, certificate]);
  let result = known.get(key);
  if (result === undefined) {
    result =
      !isRefutedAt(terms, sentence, groundTerms(terms, MOST_TERMS)) &&
      (takesWitnessesFromHypotheses(certificate) || passes(terms, sentence, certificate));
    known.set(key, result);
  }
  return result;
}

/** Whether some ground terms make a sentence false, whatever the others do. */
function isRefutedAt(record: TermsRecord, sentence: FormulaRecord, range: readonly Ground[]): boolean {
  const ground = new GroundTerms(record);
  return truth(sentence, new Map()) === false;

  /** Null when the terms of the range do not decide it. */
  function truth(formula: FormulaRecord, values: ReadonlyMap<string, Ground>): boolean | null {
    const part = (inner: unknown) => truth(inner as FormulaRecord, values);
    const junction = (parts: readonly (boolean | null)[], decisive: boolean) =>
      parts.includes(decisive) ? decisive : parts.includes(null) ? null : !decisive;
    const opposite = (value: boolean | null) => (value === null ? null : !value);
    switch (formula[0]) {
      case "true":
        return true;
      case "false":
        return false;
      case "is":
        return ground.holds(
          formula[1],
          formula.slice(2).map((name) => values.get(name as string)!),
        );
      case "=":
        return textOf(values.get(formula[1] as string)) === textOf(values.get(formula[2] as string));
      case "not":
        return opposite(part(formula[1]));
      case "and":
        return junction(formula.slice(1).map(part), false);
      case "or":
        return junction(formula.slice(1).map(part), true);
      case "implies":
        return junction([opposite(part(formula[1])), part(formula[2])], true);
      case "iff": {
        const [left, right] = [part(formula[1]), part(formula[2])];
        return left === null || right === null ? null : left === right;
      }
      case "forall":
      case "exists": {
        const [kind, variable, body] = formula;
        const decisive = kind === "exists";
        const isDecided = range.some((term) => truth(body, new Map(values).set(variable, term)) === decisive);
        return isDecided ? decisive : null;
      }
    }
  }
}
