/** The homogeneous carriers, each beside a sample of the same structure that is built another way. */
import fc from "fast-check";
import { BooleanAlgebra, type BooleanConfiguration } from "../../lib/carriers/boolean-algebra.ts";
import { Generic, type GenericConfiguration } from "../../lib/carriers/generic.ts";
import type { Listed } from "../../lib/carriers/listed.ts";
import type { Structure } from "../../lib/carriers/structure.ts";
import { booleanAlgebraVocabulary, genericVocabulary } from "../../lib/carriers/vocabulary/generic.ts";
import type { Vocabulary } from "../../lib/carriers/vocabulary/vocabulary.ts";
import {
  and,
  atom,
  equal,
  type Formula,
  not,
  or,
  partsOf,
  quantify,
  type RelationSymbol,
} from "../../lib/logic/formula.ts";
import {
  digitSample,
  dyadicSample,
  orderSample,
  type Sample,
  type SignatureTables,
} from "./homogeneous-samples.ts";

export interface Case {
  readonly name: string;
  readonly carrier: Listed<object>;
  readonly vocabulary: Vocabulary<object>;
  /** Elements are numbers of either sort; the sample alone looks into them. */
  sampleOf(stages: number): Sample<bigint | number>;
  /** Stages beyond which the sample is too large to walk over. */
  readonly mostStages: number;
  /** The signature that tuples with a configuration have in the sample. */
  signatureOf(configuration: object): string;
}

const genericCase = (of: "graph" | "digraph" | "tournament" | "partial-order"): Case => {
  const carrier = new Generic({ kind: "generic", of });
  return {
    name: of,
    carrier,
    vocabulary: genericVocabulary(carrier) as Vocabulary<object>,
    sampleOf: (stages) =>
      (of === "partial-order" ? orderSample(stages) : digitSample(of, stages)) as Sample<bigint | number>,
    mostStages: of === "digraph" ? 3 : 4,
    signatureOf(configuration) {
      const { named, codes } = configuration as GenericConfiguration;
      return `${named}:${codes.map((code) => "0123="[code]).join("")}`;
    },
  };
};

const algebraCase = (name: string, zero: boolean, top: boolean): Case => {
  const carrier = new BooleanAlgebra({ kind: "boolean-algebra", zero, top });
  return {
    name,
    carrier,
    vocabulary: booleanAlgebraVocabulary(carrier) as Vocabulary<object>,
    sampleOf: (stages) => dyadicSample(zero, top, stages) as Sample<bigint | number>,
    mostStages: 3,
    signatureOf(configuration) {
      const { named, cells } = configuration as BooleanConfiguration;
      return `${named}:${cells.reduce((bits, cell) => bits | (1 << cell), 0)}`;
    },
  };
};

export const genericCases: readonly Case[] = (
  ["graph", "digraph", "tournament", "partial-order"] as const
).map(genericCase);
export const fullAlgebra: Case = algebraCase("Boolean algebra", true, true);
export const algebraWithoutZero: Case = algebraCase("Boolean algebra without zero", false, true);
export const algebraWithoutEnds: Case = algebraCase("Boolean algebra without zero and top", false, false);
export const algebraCases: readonly Case[] = [fullAlgebra, algebraWithoutZero, algebraWithoutEnds];
export const cases: readonly Case[] = [...genericCases, ...algebraCases];

/** The listed configuration of a tuple of the sample; an error when it is not listed, or listed twice. */
export function locate(
  { carrier, signatureOf }: Case,
  sample: Sample<unknown>,
  tuple: readonly unknown[],
): object {
  return tuple.reduce<object>((configuration, _, place) => {
    const wanted = sample.signature(tuple.slice(0, place + 1));
    const found = carrier.extensions(configuration, 0).filter((extended) => signatureOf(extended) === wanted);
    if (found.length !== 1) throw new Error(`${wanted} is listed ${found.length} times`);
    return found[0]!;
  }, carrier.empty);
}

/** Tables by kinds for the carrier and by signatures for the sample, which say the same. */
export function tablesFor(
  { carrier, signatureOf }: Case,
  relations: readonly RelationSymbol[],
  holds: (relation: RelationSymbol, kind: number, signature: string) => boolean,
): { readonly structure: Structure; readonly signatures: SignatureTables } {
  const tables = new Map<string, { relation: RelationSymbol; holds: Uint8Array }>();
  const signatures = new Map<string, Set<string>>();
  for (const relation of relations) {
    const examples = carrier.kindExamples(relation.places);
    const entries = examples.map((example, kind) => holds(relation, kind, signatureOf(example)));
    tables.set(relation.name, { relation, holds: Uint8Array.from(entries, Number) });
    signatures.set(relation.name, new Set(examples.map(signatureOf).filter((_, kind) => entries[kind])));
  }
  return { structure: { carrier, tables } as Structure, signatures };
}

/** Tables chosen by bits: the entry of kind k is bit k modulo 31 of the number for the relation. */
export function randomTables(
  which: Case,
  relations: readonly RelationSymbol[],
  numbers: readonly number[],
): ReturnType<typeof tablesFor> {
  return tablesFor(which, relations, (relation, kind) => {
    const number = numbers[relations.indexOf(relation)]!;
    return ((number >>> (kind % 31)) & 1) === 1;
  });
}

/** How many quantifiers lie one inside another. */
export function depthOf(formula: Formula): number {
  const inner = Math.max(0, ...partsOf(formula).map(depthOf));
  return formula.kind === "forall" || formula.kind === "exists" ? inner + 1 : inner;
}

/** Sentences of exactly so many quantifiers in front, each variable of its own, over atoms of all of them. */
export function prenexSentences(relations: readonly RelationSymbol[], depth: number): fc.Arbitrary<Formula> {
  const names = ["x", "y", "z", "w", "u"].slice(0, depth);
  const variable = fc.constantFrom(...names);
  const atoms = fc.oneof(
    { weight: 1, arbitrary: fc.tuple(variable, variable).map(([x, y]) => equal(x, y)) },
    {
      weight: 6,
      arbitrary: fc
        .constantFrom(...relations)
        .chain((relation) =>
          fc
            .array(variable, { minLength: relation.places, maxLength: relation.places })
            .map((args) => atom(relation, ...args)),
        ),
    },
  );
  const literal = fc.tuple(fc.boolean(), atoms).map(([isNegated, a]) => (isNegated ? not(a) : a));
  const clause = fc.array(literal, { minLength: 1, maxLength: 3 });
  const matrix = fc
    .tuple(fc.boolean(), fc.array(clause, { minLength: 2, maxLength: 3 }))
    .map(([isConjunctive, clauses]) =>
      isConjunctive
        ? and(...clauses.map((literals) => or(...literals)))
        : or(...clauses.map((literals) => and(...literals))),
    );
  return fc
    .tuple(fc.array(fc.boolean(), { minLength: depth, maxLength: depth }), matrix)
    .map(([kinds, body]) =>
      names.reduceRight<Formula>(
        (inner, name, index) => quantify(kinds[index] ? "forall" : "exists", name, inner),
        body,
      ),
    );
}
