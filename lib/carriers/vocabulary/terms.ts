/** Building and writing atoms about elements of carriers, as the vocabularies need it. */
import { termsOf } from "../../logic/carrier-formulas.ts";
import type { CarrierAtom, ElementTerm } from "../../logic/structure-definition.ts";
import type { Complaint } from "./vocabulary.ts";

export type Comparison = CarrierAtom & { readonly kind: "compare" };
export type Label = CarrierAtom & { readonly kind: "label" };
export type Element = ElementTerm & { readonly kind: "element" };
export type Operation = ElementTerm & { readonly kind: "apply" };

export function element(variable: string): Element {
  return { kind: "element", variable, path: [] };
}

export function number(value: number): ElementTerm {
  return { kind: "number", value };
}

export function apply(name: Operation["name"], ...args: readonly ElementTerm[]): Operation {
  return { kind: "apply", name, args };
}

export function compare(left: ElementTerm, relation: Comparison["relation"], right: ElementTerm): Comparison {
  return { kind: "compare", relation, left, right };
}

export function complain(message: string, suggestion: string | null): Complaint {
  return { message, suggestion };
}

/** That an atom says something that the kinds of the carrier do not tell. */
export function unsettled(message: string): Complaint {
  return { message, suggestion: null, isUnsettled: true };
}

/** That elements of a carrier are no others' components. */
export function pathComplaint({ variable, path }: Element, where: string): Complaint | null {
  if (path.length === 0) return null;
  return complain(`the elements of ${where} have no components`, `\`${variable}\` itself`);
}

/** That elements of a carrier have no colours, copies or parts. */
export function labelComplaint(name: Label["name"], where: string, suggestion: string): Complaint {
  const plural = { colour: "colours", copy: "copies", part: "parts" }[name];
  return complain(`${where} has no ${plural}`, suggestion);
}

/** The atom, which is known to be a comparison. */
export function asComparison(atom: CarrierAtom): Comparison {
  if (atom.kind !== "compare") throw new Error(`${atom.name} is no comparison`);
  return atom;
}

/** The first complaint about a term of the atom. */
export function firstComplaint(
  atom: CarrierAtom,
  complaint: (term: ElementTerm) => Complaint | null,
): Complaint | null {
  for (const term of termsOf(atom)) {
    const found = complaint(term);
    if (found !== null) return found;
  }
  return null;
}

/** All pairs of members, the earlier one first. */
export function pairsOf<Member>(members: readonly Member[]): readonly (readonly [Member, Member])[] {
  return members.flatMap((x, i) => members.slice(i + 1).map((y) => [x, y] as const));
}

/** A term as in a cell. */
export function writeTerm(term: ElementTerm): string {
  switch (term.kind) {
    case "element":
      return [term.variable, ...term.path].join(".");
    case "number":
      return String(term.value);
    case "shift":
      return `${writeTerm(term.of)} ${term.by < 0 ? "-" : "+"} ${Math.abs(term.by)}`;
    case "apply":
      return `${term.name}(${term.args.map(writeTerm).join(", ")})`;
  }
}

/** A comparison as in a cell. */
export function writeComparison({ left, relation, right }: Comparison): string {
  return `${writeTerm(left)} ${relation} ${writeTerm(right)}`;
}
