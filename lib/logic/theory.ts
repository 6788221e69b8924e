/** Theories: finite sets of labelled closed formulas, and what can be done to them without searching. */
import {
  and,
  depthOf,
  type Formula,
  mapAtoms,
  mapParts,
  not,
  type RelationSymbol,
  relationsOf,
  sameFormula,
  usesIdentity,
} from "./formula.ts";

/** One axiom of a theory. */
export interface Axiom {
  readonly label: string;
  /** Closed. */
  readonly formula: Formula;
  /** Whether the user gave the label; labels that Twoplace gave (`a1`, `a2`, …) may change when theories join. */
  readonly named: boolean;
}

/** The relations that a question is about, and whether it is questioned with identity. */
export interface Signature {
  /** Sorted by name, each name once. */
  readonly relations: readonly RelationSymbol[];
  readonly identity: boolean;
}

/** A finite set of labelled axioms; no label occurs twice. */
export interface Theory {
  readonly axioms: readonly Axiom[];
  /** The sole declared relation, which is the signature when no relation occurs in the axioms. */
  readonly fallback: RelationSymbol | null;
}

/** Axioms of a theory whose sets of axioms are gone through; those of larger ones are too many. */
export const MOST_MINIMISED = 16;

/** What went wrong when theories were put together. Every case names the label or relation at fault. */
export type TheoryProblem =
  | { readonly kind: "label-twice"; readonly label: string }
  | { readonly kind: "no-such-label"; readonly label: string; readonly known: readonly string[] }
  | { readonly kind: "places-differ"; readonly relation: string; readonly places: readonly [number, number] };

/** A theory, or the problem that kept it from coming about. */
export type TheoryResult = { readonly theory: Theory } | { readonly problem: TheoryProblem };

/** The sentences of a theory, in the order of its axioms. */
export function sentencesOf(theory: Theory): readonly Formula[] {
  return theory.axioms.map((axiom) => axiom.formula);
}

/** The conjunction of all axioms. */
export function conjunctionOf(theory: Theory): Formula {
  return and(...sentencesOf(theory));
}

/** The quantifier rank of a theory: that of its deepest axiom. */
export function theoryDepth(theory: Theory): number {
  return theory.axioms.reduce((most, axiom) => Math.max(most, depthOf(axiom.formula)), 0);
}

/**
 * The signature of some sentences; `fallback` is taken when no relation occurs in them.
 * @throws Error when a relation occurs with two numbers of places, which the parser refuses
 */
export function signatureOf(sentences: readonly Formula[], fallback: RelationSymbol | null): Signature {
  const found = new Map<string, RelationSymbol>();
  for (const relation of sentences.flatMap(relationsOf)) {
    const before = found.get(relation.name);
    if (before !== undefined && before.places !== relation.places)
      throw new Error(`${relation.name} occurs with ${before.places} and with ${relation.places} places`);
    found.set(relation.name, relation);
  }
  if (found.size === 0 && fallback !== null) found.set(fallback.name, fallback);
  const relations = [...found.values()].sort((a, b) => (a.name < b.name ? -1 : 1));
  return { relations, identity: sentences.some(usesIdentity) };
}

/** The signature of a theory. */
export function theorySignature(theory: Theory): Signature {
  return signatureOf(sentencesOf(theory), theory.fallback);
}

/**
 * All axioms of both. An axiom of the second with the label and the formula of one of the first is the same axiom;
 * labels that Twoplace gave are numbered on; a user's label with two different formulas is a problem.
 */
export function joinTheories(first: Theory, second: Theory): TheoryResult {
  const axioms: Axiom[] = [...first.axioms];
  const taken = new Map(axioms.map((axiom) => [axiom.label, axiom]));
  const reserved = new Set(second.axioms.filter((axiom) => axiom.named).map((axiom) => axiom.label));
  for (const axiom of second.axioms) {
    const clash = taken.get(axiom.label);
    let added = axiom;
    if (clash !== undefined) {
      if (sameFormula(clash.formula, axiom.formula)) continue;
      if (axiom.named && clash.named) return { problem: { kind: "label-twice", label: axiom.label } };
      if (axiom.named) {
        // The older axiom has a label of ours: it gives way.
        const index = axioms.indexOf(clash);
        const moved = { ...clash, label: nextLabel(taken, reserved) };
        axioms[index] = moved;
        taken.set(moved.label, moved);
      } else added = { ...axiom, label: nextLabel(taken, reserved) };
    }
    axioms.push(added);
    taken.set(added.label, added);
  }
  return checkedTheory({ axioms, fallback: first.fallback ?? second.fallback });
}

/** The first of `a1`, `a2`, … that is in neither collection. */
export function nextLabel(taken: { has(label: string): boolean }, reserved?: ReadonlySet<string>): string {
  for (let number = 1; ; number += 1) {
    const label = `a${number}`;
    if (!taken.has(label) && !(reserved?.has(label) ?? false)) return label;
  }
}

/** The theory without one axiom. */
export function withoutAxiom(theory: Theory, label: string): TheoryResult {
  if (!theory.axioms.some((axiom) => axiom.label === label)) return { problem: noSuchLabel(theory, label) };
  return { theory: { ...theory, axioms: theory.axioms.filter((axiom) => axiom.label !== label) } };
}

/** The theory with another formula under a label that it has. */
export function replacingAxiom(theory: Theory, label: string, formula: Formula): TheoryResult {
  if (!theory.axioms.some((axiom) => axiom.label === label)) return { problem: noSuchLabel(theory, label) };
  const axioms = theory.axioms.map((axiom) => (axiom.label === label ? { ...axiom, formula } : axiom));
  return checkedTheory({ ...theory, axioms });
}

/** The theory that has one axiom of this one, under its label. */
export function singleAxiom(theory: Theory, label: string): TheoryResult {
  const axiom = theory.axioms.find((candidate) => candidate.label === label);
  return axiom === undefined
    ? { problem: noSuchLabel(theory, label) }
    : { theory: { ...theory, axioms: [axiom] } };
}

function noSuchLabel(theory: Theory, label: string): TheoryProblem {
  return { kind: "no-such-label", label, known: theory.axioms.map((axiom) => axiom.label) };
}

/** A theory is sound to question only if no relation occurs in it with two numbers of places. */
export function checkedTheory(theory: Theory): TheoryResult {
  const places = new Map<string, number>();
  const seen = new Set<string>();
  for (const axiom of theory.axioms) {
    if (seen.has(axiom.label)) return { problem: { kind: "label-twice", label: axiom.label } };
    seen.add(axiom.label);
  }
  for (const relation of theory.axioms.flatMap((axiom) => relationsOf(axiom.formula))) {
    const before = places.get(relation.name);
    if (before !== undefined && before !== relation.places)
      return {
        problem: { kind: "places-differ", relation: relation.name, places: [before, relation.places] },
      };
    places.set(relation.name, relation.places);
  }
  return { theory };
}

/** Every two-place relation read backwards: `Rxy` becomes `Ryx`. Other relations stay. */
export function converseFormula(formula: Formula): Formula {
  return mapAtoms(formula, (part) =>
    part.args.length === 2 ? { ...part, args: [part.args[1]!, part.args[0]!] } : part,
  );
}

/** Every two-place relation replaced by its complement: `Rxy` becomes `¬Rxy`. Other relations stay. */
export function complementFormula(formula: Formula): Formula {
  return mapAtoms(formula, (part) => (part.args.length === 2 ? not(part) : part));
}

/** The theory of the converse relations. */
export function converseTheory(theory: Theory): Theory {
  return mapTheory(theory, converseFormula);
}

/** The theory of the complementary relations. */
export function complementTheory(theory: Theory): Theory {
  return mapTheory(theory, (formula) => cancelDoubleNegation(complementFormula(formula)));
}

function mapTheory(theory: Theory, change: (formula: Formula) => Formula): Theory {
  return { ...theory, axioms: theory.axioms.map((axiom) => ({ ...axiom, formula: change(axiom.formula) })) };
}

/** `¬¬φ` becomes `φ` everywhere, so that complementing twice gives the formula back. */
function cancelDoubleNegation(formula: Formula): Formula {
  if (formula.kind === "not" && formula.body.kind === "not") return cancelDoubleNegation(formula.body.body);
  return mapParts(formula, cancelDoubleNegation);
}
