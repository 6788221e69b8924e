/**
 * Relations defined on lines, and sentences about them, as quantified linear arithmetic: the rationals as `Real`, the
 * integers as `Int`, the natural numbers as `Int` with every quantifier restricted to x ≥ 0.
 */
import fc from "fast-check";
import { DenseLine } from "../../lib/carriers/dense-line.ts";
import { HalfLine } from "../../lib/carriers/half-line.ts";
import { IntegerLine } from "../../lib/carriers/integer-line.ts";
import type { Listed } from "../../lib/carriers/listed.ts";
import type { Structure } from "../../lib/carriers/structure.ts";
import { recordStructure } from "../../lib/carriers/structure-record.ts";
import {
  denseLineVocabulary,
  halfLineVocabulary,
  integerLineVocabulary,
  neededEnds,
  neededOffset,
} from "../../lib/carriers/vocabulary/lines.ts";
import type { Vocabulary } from "../../lib/carriers/vocabulary/vocabulary.ts";
import { isTrueIn } from "../../lib/evidence/evaluate.ts";
import { atomsOf, isTrueOf } from "../../lib/logic/carrier-formulas.ts";
import {
  and,
  atom,
  equal,
  exists,
  type Formula,
  forall,
  iff,
  implies,
  not,
  or,
  type RelationSymbol,
} from "../../lib/logic/formula.ts";
import { Meter } from "../../lib/logic/meter.ts";
import { recordFormula } from "../../lib/logic/records/formulas.ts";
import type { CarrierAtom, CarrierFormula, ElementTerm } from "../../lib/logic/structure-definition.ts";
import { satisfies } from "../../lib/structures/evaluate.ts";
import type { Oracle } from "./z3.ts";

export type Line = "rationals" | "integers" | "naturals";
export const LINES: readonly Line[] = ["rationals", "integers", "naturals"];

export interface Definition {
  readonly relation: RelationSymbol;
  readonly variables: readonly string[];
  readonly formula: CarrierFormula;
}

export interface Question {
  readonly line: Line;
  readonly definitions: readonly Definition[];
  readonly sentence: Formula;
}

export const R: RelationSymbol = { name: "R", places: 2, infix: false };
export const S: RelationSymbol = { name: "S", places: 2, infix: false };
export const P: RelationSymbol = { name: "P", places: 1, infix: false };

/** The defined structure, its tables filled by what the vocabulary says of an example of each kind. */
export function structureOf({ line, definitions }: Question): Structure {
  const atoms = definitions.flatMap(({ formula }) => atomsOf(formula));
  const [offset, ends] = [neededOffset(atoms), neededEnds(atoms)];
  switch (line) {
    case "rationals": {
      const carrier = new DenseLine({ kind: "dense-line", colours: 1 });
      return fill(carrier, denseLineVocabulary(carrier), definitions);
    }
    case "integers": {
      const carrier = new IntegerLine({ kind: "integer-line", offset });
      return fill(carrier, integerLineVocabulary(carrier), definitions);
    }
    case "naturals": {
      const carrier = new HalfLine({ kind: "half-line", offset, ends });
      return fill(carrier, halfLineVocabulary(carrier), definitions);
    }
  }
}

export function fill<Configuration extends object>(
  carrier: Listed<Configuration>,
  vocabulary: Vocabulary<Configuration>,
  definitions: readonly Definition[],
): Structure {
  const tables = new Map(
    definitions.map(({ relation, variables, formula }) => {
      for (const one of atomsOf(formula)) {
        const complaint = vocabulary.complaint(one);
        if (complaint !== null) throw new Error(complaint.message);
      }
      const examples = carrier.kindExamples(relation.places);
      const holds = Uint8Array.from(examples, (configuration) =>
        Number(
          isTrueOf(formula, (one) =>
            vocabulary.holds(one, configuration, (variable) => variables.indexOf(variable)),
          ),
        ),
      );
      return [relation.name, { relation, holds }] as const;
    }),
  );
  return { carrier, tables };
}

/** A script whose assertion is satisfiable if and only if the sentence, which is closed, is true. */
export function printArithmetic({ line, definitions, sentence }: Question): string {
  const sort = line === "rationals" ? "Real" : "Int";
  const lines = definitions.map(({ relation, variables, formula }) => {
    const parameters = variables.map((variable) => `(${variable} ${sort})`).join(" ");
    return `(define-fun ${relation.name} (${parameters}) Bool ${printDefinition(formula)})`;
  });
  return [...lines, `(assert ${print(sentence)})`, ""].join("\n");

  function print(formula: Formula): string {
    switch (formula.kind) {
      case "true":
      case "false":
        return formula.kind;
      case "atom":
        return `(${formula.relation.name} ${formula.args.join(" ")})`;
      case "equal":
        return `(= ${formula.left} ${formula.right})`;
      case "not":
        return `(not ${print(formula.body)})`;
      case "and":
      case "or":
        return `(${formula.kind} ${formula.parts.map(print).join(" ")})`;
      case "implies":
        return `(=> ${print(formula.left)} ${print(formula.right)})`;
      case "iff":
        return `(= ${print(formula.left)} ${print(formula.right)})`;
      case "forall":
      case "exists": {
        const body = print(formula.body);
        const joint = formula.kind === "forall" ? "=>" : "and";
        const inside = line === "naturals" ? `(${joint} (>= ${formula.variable} 0) ${body})` : body;
        return `(${formula.kind} ((${formula.variable} ${sort})) ${inside})`;
      }
    }
  }
}

function printDefinition(formula: CarrierFormula): string {
  switch (formula.kind) {
    case "true":
    case "false":
      return formula.kind;
    case "not":
      return `(not ${printDefinition(formula.body)})`;
    case "and":
    case "or":
      return `(${formula.kind} ${formula.parts.map(printDefinition).join(" ")})`;
    case "implies":
      return `(=> ${printDefinition(formula.left)} ${printDefinition(formula.right)})`;
    case "iff":
      return `(= ${printDefinition(formula.left)} ${printDefinition(formula.right)})`;
    case "compare": {
      const sign = { "=": "=", "<": "<", "≤": "<=" }[formula.relation];
      return `(${sign} ${printTerm(formula.left)} ${printTerm(formula.right)})`;
    }
    default:
      throw new Error(`${formula.name} has no arithmetic`);
  }
}

function printTerm(term: ElementTerm): string {
  switch (term.kind) {
    case "element":
      return term.variable;
    case "number":
      return String(term.value);
    case "shift":
      return `(+ ${printTerm(term.of)} ${term.by < 0 ? `(- ${-term.by})` : term.by})`;
    case "apply":
      throw new Error(`${term.name} has no arithmetic`);
  }
}

/** Atoms with constants up to `largest`, as far as the line has any. */
export function lineAtoms(
  line: Line,
  variables: readonly string[],
  largest: number,
): fc.Arbitrary<CarrierAtom> {
  const element = fc
    .constantFrom(...variables)
    .map((variable): ElementTerm => ({ kind: "element", variable, path: [] }));
  const shifted = fc
    .tuple(element, fc.integer({ min: -largest, max: largest }))
    .map(([of, by]): ElementTerm => (by === 0 ? of : { kind: "shift", of, by }));
  const number = fc.nat(largest).map((value): ElementTerm => ({ kind: "number", value }));
  const relation = fc.constantFrom("=" as const, "<" as const, "≤" as const);
  const compared = (left: fc.Arbitrary<ElementTerm>, right: fc.Arbitrary<ElementTerm>) =>
    fc.record({ kind: fc.constant("compare" as const), relation, left, right });
  if (line === "rationals") return compared(element, element);
  // Elements at a distance, now and then one with itself.
  const apart = fc
    .tuple(
      fc.shuffledSubarray([...variables], { minLength: variables.length }),
      fc.integer({ min: 1, max: largest }),
      relation,
    )
    .map(([[x, y], by, sign]): CarrierAtom => {
      const [left, right] = [x!, y ?? x!].map(
        (variable): ElementTerm => ({ kind: "element", variable, path: [] }),
      );
      return { kind: "compare", relation: sign, left: { kind: "shift", of: left!, by }, right: right! };
    });
  const pair = fc.oneof(
    { weight: 3, arbitrary: apart },
    { weight: 1, arbitrary: compared(element, shifted) },
  );
  return line === "integers"
    ? pair
    : fc.oneof(
        { weight: variables.length === 1 ? 0 : 2, arbitrary: pair },
        { weight: 1, arbitrary: compared(shifted, number) },
        { weight: 1, arbitrary: compared(number, element) },
      );
}

function definitionsOn(line: Line, largest: number): fc.Arbitrary<readonly Definition[]> {
  const formulaOf = (variables: readonly string[]): fc.Arbitrary<CarrierFormula> => {
    const one = fc
      .tuple(lineAtoms(line, variables, largest), fc.boolean())
      .map(([body, positive]): CarrierFormula => (positive ? body : { kind: "not", body }));
    const junction = (kind: "and" | "or") =>
      fc.array(one, { minLength: 2, maxLength: 3 }).map((parts): CarrierFormula => ({ kind, parts }));
    return fc.oneof(
      { weight: 3, arbitrary: one },
      junction("and"),
      junction("or"),
      fc
        .tuple(junction("and"), junction("or"))
        .map(([left, right]): CarrierFormula => ({ kind: "iff", left, right })),
    );
  };
  const random = (relation: RelationSymbol, variables: readonly string[]) =>
    formulaOf(variables).map((formula) => defined(relation, variables, formula));
  const binary = [random(R, ["x", "y"]), random(S, ["x", "y"])];
  return fc.tuple(...binary, ...(line === "naturals" ? [random(P, ["x"])] : []));
}

/** Sentences exactly so many quantifiers deep, whose innermost formulas are about several of the variables. */
function sentencesOf(relations: readonly RelationSymbol[], depth: number): fc.Arbitrary<Formula> {
  const literal = (scope: readonly string[]): fc.Arbitrary<Formula> => {
    const variable = fc.constantFrom(...scope);
    const atoms = fc
      .constantFrom(...relations)
      .chain((relation) =>
        fc
          .array(variable, { minLength: relation.places, maxLength: relation.places })
          .map((args) => atom(relation, ...args)),
      );
    const equations = fc.tuple(variable, variable).map(([x, y]) => equal(x, y));
    return fc
      .tuple(fc.oneof({ weight: 5, arbitrary: atoms }, { weight: 1, arbitrary: equations }), fc.boolean())
      .map(([body, positive]) => (positive ? body : not(body)));
  };
  const matrix = (scope: readonly string[]): fc.Arbitrary<Formula> => {
    const one = literal(scope);
    return fc.oneof(
      fc.array(one, { minLength: 2, maxLength: 4 }).map((parts) => and(...parts)),
      fc.array(one, { minLength: 2, maxLength: 4 }).map((parts) => or(...parts)),
      fc.tuple(one, one, one).map(([a, b, c]) => implies(and(a, b), c)),
      fc.tuple(one, one, one).map(([a, b, c]) => iff(a, or(b, c))),
    );
  };
  const below = (left: number, scope: readonly string[]): fc.Arbitrary<Formula> => {
    if (left === 0) return matrix(scope);
    const variable = ["a", "b", "c", "d"][scope.length]!;
    const quantified = fc
      .tuple(fc.boolean(), below(left - 1, [...scope, variable]))
      .map(([all, body]) => (all ? forall(variable, body) : exists(variable, body)));
    if (scope.length === 0) return quantified;
    return fc.oneof(
      { weight: 4, arbitrary: quantified },
      { weight: 1, arbitrary: fc.tuple(literal(scope), quantified).map(([a, b]) => and(a, b)) },
      { weight: 1, arbitrary: fc.tuple(literal(scope), quantified).map(([a, b]) => implies(a, b)) },
      { weight: 1, arbitrary: fc.tuple(quantified, literal(scope)).map(([a, b]) => iff(a, b)) },
    );
  };
  return below(depth, []);
}

/**
 * That one relation is a part of another, both made of R and S by composition and more, as "what lies two steps of R off is
 * S": sentences of depth at least 2 that depend on how far elements are from each other.
 */
function inclusions(depth: number): fc.Arbitrary<Formula> {
  const term = (x: string, y: string, between: readonly string[]): fc.Arbitrary<Formula> => {
    const simple = fc
      .tuple(fc.constantFrom(R, S), fc.boolean())
      .map(([relation, converse]) => (converse ? atom(relation, y, x) : atom(relation, x, y)));
    const [z, ...others] = between;
    if (z === undefined)
      return fc.oneof({ weight: 4, arbitrary: simple }, { weight: 1, arbitrary: simple.map(not) });
    const composed = fc
      .tuple(term(x, z, others), term(z, y, others), fc.boolean())
      .map(([a, b, positive]) => (positive ? exists(z, and(a, b)) : forall(z, or(a, b))));
    return fc.oneof(
      { weight: 6, arbitrary: composed },
      { weight: 1, arbitrary: composed.map(not) },
      { weight: 1, arbitrary: fc.tuple(composed, simple).map(([a, b]) => and(a, b)) },
      { weight: 1, arbitrary: fc.tuple(composed, simple).map(([a, b]) => or(a, b)) },
    );
  };
  const between = ["c", "d"].slice(0, depth - 2);
  return fc
    .tuple(term("a", "b", between), term("a", "b", between.slice(1)), fc.boolean(), fc.boolean())
    .map(([more, less, turned, all]) => {
      const [left, right] = turned ? [less, more] : [more, less];
      return all ? forall(["a", "b"], implies(left, right)) : exists("a", forall("b", iff(left, right)));
    });
}

/**
 * Chains of steps, R at least k + 1 long and S exactly k: whether one chain leads as far as another, or as far from P. They meet
 * exactly what cannot be told apart any more with so many quantifiers.
 */
function chainsOn(line: "integers" | "naturals", depth: number): fc.Arbitrary<Question> {
  const chain = (x: string, y: string, between: readonly string[]): fc.Arbitrary<Formula> => {
    const [z, ...others] = between;
    if (z === undefined) return fc.constantFrom(R, R, S).map((relation) => atom(relation, x, y));
    return fc.tuple(chain(x, z, others), chain(z, y, others)).map(([a, b]) => exists(z, and(a, b)));
  };
  // How far an element is from the end of the half line.
  const far = (x: string, between: readonly string[]): fc.Arbitrary<Formula> => {
    const [z, ...others] = between;
    if (z === undefined) return fc.constantFrom(not(atom(P, x)), atom(P, x), equal(x, x));
    return fc.tuple(chain(z, x, others), far(z, others)).map(([a, b]) => exists(z, and(a, b)));
  };
  const compared = (outer: readonly string[], part: fc.Arbitrary<Formula>) =>
    fc.tuple(part, part, fc.nat(3)).map(([left, right, form]) => {
      if (form === 0) return exists(outer, left);
      if (form === 1) return exists(outer, and(left, not(right)));
      if (form === 2) return forall(outer, implies(left, right));
      return exists(outer.slice(0, -1), forall(outer.slice(-1), iff(left, right)));
    });
  const pairs = compared(["a", "b"], chain("a", "b", ["c", "d"].slice(0, depth - 2)));
  const ends = compared(["b"], far("b", ["a", "c", "d"].slice(0, depth - 1)));
  const sentence = line === "integers" ? pairs : fc.oneof(pairs, ends);
  const [x, y] = ["x", "y"].map((variable): ElementTerm => ({ kind: "element", variable, path: [] }));
  const definitions = fc
    .tuple(fc.nat(depth <= 3 ? 2 : 1), fc.nat(2))
    .map(([k, end]): readonly Definition[] => [
      defined(R, ["x", "y"], {
        kind: "compare",
        relation: "<",
        left: { kind: "shift", of: x!, by: k },
        right: y!,
      }),
      defined(S, ["x", "y"], {
        kind: "compare",
        relation: "=",
        left: { kind: "shift", of: x!, by: k },
        right: y!,
      }),
      ...(line === "integers"
        ? []
        : [
            defined(P, ["x"], {
              kind: "compare",
              relation: "≤",
              left: x!,
              right: { kind: "number", value: end },
            }),
          ]),
    ]);
  return fc
    .tuple(definitions, sentence)
    .map(([defined, one]) => ({ line, definitions: defined, sentence: one }));
}

function defined(
  relation: RelationSymbol,
  variables: readonly string[],
  formula: CarrierFormula,
): Definition {
  return { relation, variables, formula };
}

/** Questions on one line; the constants in definitions are smaller where the sentence is deep. */
export function questionsOn(line: Line, depth: number): fc.Arbitrary<Question> {
  const random = definitionsOn(line, depth <= 3 ? 2 : 1).chain((definitions) => {
    const free = sentencesOf(
      definitions.map(({ relation }) => relation),
      depth,
    );
    const sentence = depth <= 2 ? free : fc.oneof(free, inclusions(depth));
    return sentence.map((one) => ({ line, definitions, sentence: one }));
  });
  if (line === "rationals" || depth <= 2) return random;
  return fc.oneof({ weight: 2, arbitrary: random }, { weight: 1, arbitrary: chainsOn(line, depth) });
}

export interface Comparison {
  readonly text: string;
  /** What z3-solver says; null when it does not know within its limit. */
  readonly expected: boolean | null;
  /** What the evaluator of the searches says, and the checker's. */
  readonly searched: boolean;
  readonly checked: boolean;
}

export async function compare(question: Question, oracle: Oracle): Promise<Comparison> {
  const text = printArithmetic(question);
  const { mistake, answer } = await oracle.read(text, { rlimit: 3_000_000 }, true);
  if (mistake !== null) throw new Error(`${mistake}\n${text}`);
  const structure = structureOf(question);
  const unlimited = () => new Meter(Number.POSITIVE_INFINITY);
  return {
    text,
    expected: answer === 0 ? null : answer === 1,
    searched: satisfies(structure, question.sentence, unlimited()),
    checked: isTrueIn(recordStructure(structure), recordFormula(question.sentence), unlimited()),
  };
}

/**
 * Puts so many questions of each depth on each line.
 * @param counts by depth, from 1
 * @returns disagreements as scripts, and how the answers are spread
 */
export async function compareMany(counts: readonly number[], seed: number, oracle: Oracle) {
  const wrong: string[] = [];
  const spread = { true: 0, false: 0, unknown: 0 };
  for (const line of LINES)
    for (const [index, numRuns] of counts.entries())
      for (const question of fc.sample(questionsOn(line, index + 1), { seed, numRuns })) {
        const { text, expected, searched, checked } = await compare(question, oracle);
        if (searched !== checked || (expected !== null && expected !== searched))
          wrong.push(`${line}: ${expected}, ${searched} by the searches, ${checked} by the checker\n${text}`);
        spread[expected === null ? "unknown" : expected ? "true" : "false"] += 1;
      }
  return { wrong, spread };
}
