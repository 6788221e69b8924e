/** Sets of axioms without finite models, and with some, made of tests/data; and laying reasons before the checker. */
import { expect } from "vitest";
import { checkEvidence } from "../../lib/evidence/check.ts";
import { EvidenceWriter } from "../../lib/inquiry/evidence-writer.ts";
import { FinitenessSearch, type NoFiniteModel } from "../../lib/inquiry/finiteness/search.ts";
import {
  and,
  atom,
  exists,
  type Formula,
  forall,
  implies,
  mapAtoms,
  mapParts,
  not,
} from "../../lib/logic/formula.ts";
import { Meter, WorkEnded } from "../../lib/logic/meter.ts";
import { sentencesOf, signatureOf } from "../../lib/logic/theory.ts";
import { claims, type Expected, infiniteOnly, questions, readSentences, readTheory } from "./corpora.ts";

export interface AxiomSet {
  readonly id: string;
  readonly axioms: readonly Formula[];
}

/** infinite-only.json. */
export const withoutFinite: readonly AxiomSet[] = infiniteOnly.map(({ id, axioms }) => ({
  id,
  axioms: sentencesOf(readTheory(axioms)),
}));

/** Premises and negated conclusions of entailments in claims.json and questions.json. */
export function refutable(expected: Expected): readonly AxiomSet[] {
  return [...claims, ...questions]
    .filter((entry) => entry.expected === expected)
    .map((entry) => {
      const [conclusion, ...premises] = readSentences([entry.conclusion, ...entry.premises]);
      return { id: entry.id, axioms: [...premises, not(conclusion!)] };
    });
}

const R = { name: "R", places: 2, infix: false };

/** What a search has found within so many steps. */
export function findReason(
  axioms: readonly Formula[],
  steps: number,
  level = Number.POSITIVE_INFINITY,
): NoFiniteModel | null {
  const search = new FinitenessSearch(axioms, signatureOf(axioms, R));
  try {
    return search.advance(level, new Meter(steps), null);
  } catch (problem) {
    if (problem instanceof WorkEnded) return null;
    throw problem;
  }
}

/** Lays a reason before the checker, as the answer to the question whether there is no finite model. */
export function expectAccepted(axioms: readonly Formula[], { reason, obligations }: NoFiniteModel): void {
  const writer = new EvidenceWriter();
  const question = { ask: "no-finite-model", axioms: writer.theory(axioms) } as const;
  writer.addNoFiniteModel(axioms, reason.record);
  for (const { derived } of obligations)
    if (derived !== null) writer.addDerivation(derived.task, derived.derivation);
  const evidence = writer.finish(question, "holds");
  expect(checkEvidence(JSON.parse(JSON.stringify(evidence)))).toMatchObject({ accepted: true });
}

/** Ways to say the same in another signature: none of them brings in finite models. */
export const variants: Readonly<Record<string, (axioms: readonly Formula[]) => readonly Formula[]>> = {
  "with axioms about other relations": (axioms) => [
    ...readSentences([
      "forall x. S(x,x)",
      "forall x y. S(x,y) -> S(y,x)",
      "forall x y z. S(x,y) & S(y,z) -> S(x,z)",
      "forall x. exists y. Q(x,y) & P(y)",
      "exists x. ~P(x)",
      "forall x y. Q(x,y) -> S(x,y)",
    ]),
    ...axioms,
  ],
  "for the elements of a part alone": (axioms) => [
    ...readSentences(["exists x. N(x)"]),
    ...axioms.map(withinPart),
  ],
  "with an element at a third place": (axioms) => [
    exists("k0", and(...axioms.map((one) => withThird(one, "k0")))),
  ],
  "for all elements at a third place": (axioms) => axioms.map((one) => forall("k0", withThird(one, "k0"))),
  "of a defined relation": (axioms) => [...readSentences(["forall x y. R(x,y) <-> ~S(y,x)"]), ...axioms],
};

function withinPart(formula: Formula): Formula {
  const inner = mapParts(formula, withinPart);
  const isIn = (variable: string) => atom({ name: "N", places: 1, infix: false }, variable);
  if (inner.kind === "forall") return { ...inner, body: implies(isIn(inner.variable), inner.body) };
  return inner.kind === "exists" ? { ...inner, body: and(isIn(inner.variable), inner.body) } : inner;
}

function withThird(formula: Formula, third: string): Formula {
  const relation = { name: "T", places: 3, infix: false };
  return mapAtoms(formula, (part) => atom(relation, third, ...part.args));
}

/** With a relation that the axioms make an equality in place of identity. */
export function withoutIdentity(axioms: readonly Formula[]): readonly Formula[] {
  const equality = { name: "E", places: 2, infix: false };
  const replaced = (formula: Formula): Formula =>
    formula.kind === "equal" ? atom(equality, formula.left, formula.right) : mapParts(formula, replaced);
  return [
    ...readSentences([
      "forall x. E(x,x)",
      "forall x y. E(x,y) -> E(y,x)",
      "forall x y z. E(x,y) & E(y,z) -> E(x,z)",
      "forall x y z. E(x,y) & R(x,z) -> R(y,z)",
      "forall x y z. E(x,y) & R(z,x) -> R(z,y)",
    ]),
    ...axioms.map(replaced),
  ];
}
