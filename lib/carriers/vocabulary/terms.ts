/** Building and writing atoms about elements of carriers, as the vocabularies need it. */
import { termsOf } from "../../logic/carrier-formulas.ts";
import type { CarrierAtom, ElementTerm } from "../../logic/structure-definition.ts";
import type { Complaint } from "./vocabulary.ts";

export type Comparison = CarrierAtom & { readonly kind: "compare" };
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
