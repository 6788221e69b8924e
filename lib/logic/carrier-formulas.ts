/** Formulas about elements of a carrier: building them, going through them, their truth. */
import type { CarrierAtom, CarrierFormula, ElementTerm } from "./structure-definition.ts";

/** An element by its variable, or a component of it. */
export type NamedElement = ElementTerm & { readonly kind: "element" };

/** The negation; `¬¬φ` is kept as written. */
export function notOf(body: CarrierFormula): CarrierFormula {
  return { kind: "not", body };
}

/** The conjunction of any number of formulas: `⊤` of none, the formula itself of one, nested ones flattened. */
export function allOf(parts: readonly CarrierFormula[]): CarrierFormula {
  return junction("and", parts);
}

/** The disjunction of any number of formulas: `⊥` of none, the formula itself of one, nested ones flattened. */
export function anyOf(parts: readonly CarrierFormula[]): CarrierFormula {
  return junction("or", parts);
}

function junction(kind: "and" | "or", parts: readonly CarrierFormula[]): CarrierFormula {
  const flat: CarrierFormula[] = [];
  for (const part of parts) {
    if (part.kind === kind) for (const inner of part.parts) flat.push(inner);
    else flat.push(part);
  }
  if (flat.length === 0) return { kind: kind === "and" ? "true" : "false" };
  return flat.length === 1 ? flat[0]! : { kind, parts: flat };
}

/** The atoms that occur, each occurrence by itself, in the order written. */
export function atomsOf(formula: CarrierFormula): readonly CarrierAtom[] {
  switch (formula.kind) {
    case "true":
    case "false":
      return [];
    case "not":
      return atomsOf(formula.body);
    case "and":
    case "or":
      return formula.parts.flatMap(atomsOf);
    case "implies":
    case "iff":
      return [...atomsOf(formula.left), ...atomsOf(formula.right)];
    default:
      return [formula];
  }
}

/** The terms that stand in an atom, not those inside of them. */
export function termsOf(atom: CarrierAtom): readonly ElementTerm[] {
  if (atom.kind === "compare") return [atom.left, atom.right];
  return atom.kind === "label" ? [atom.of] : atom.args;
}

/** The atom with each of its terms replaced. */
export function mapTerms(atom: CarrierAtom, change: (term: ElementTerm) => ElementTerm): CarrierAtom {
  if (atom.kind === "compare") return { ...atom, left: change(atom.left), right: change(atom.right) };
  return atom.kind === "label" ? { ...atom, of: change(atom.of) } : { ...atom, args: atom.args.map(change) };
}

/** Whether a formula is true where its atoms are as `holds` says. */
export function isTrueOf(formula: CarrierFormula, holds: (atom: CarrierAtom) => boolean): boolean {
  switch (formula.kind) {
    case "true":
      return true;
    case "false":
      return false;
    case "not":
      return !isTrueOf(formula.body, holds);
    case "and":
      return formula.parts.every((part) => isTrueOf(part, holds));
    case "or":
      return formula.parts.some((part) => isTrueOf(part, holds));
    case "implies":
      return !isTrueOf(formula.left, holds) || isTrueOf(formula.right, holds);
    case "iff":
      return isTrueOf(formula.left, holds) === isTrueOf(formula.right, holds);
    default:
      return holds(formula);
  }
}

/** The elements that occur in an atom, each occurrence by itself, in the order written. */
export function elementsOf(atom: CarrierAtom): readonly NamedElement[] {
  const within = (term: ElementTerm): readonly NamedElement[] => {
    if (term.kind === "element") return [term];
    if (term.kind === "number") return [];
    return term.kind === "shift" ? within(term.of) : term.args.flatMap(within);
  };
  return termsOf(atom).flatMap(within);
}

/** The atom with each element that occurs in it replaced. */
export function mapElements(atom: CarrierAtom, change: (element: NamedElement) => ElementTerm): CarrierAtom {
  const within = (term: ElementTerm): ElementTerm => {
    if (term.kind === "element") return change(term);
    if (term.kind === "number") return term;
    return term.kind === "shift"
      ? { ...term, of: within(term.of) }
      : { ...term, args: term.args.map(within) };
  };
  return mapTerms(atom, within);
}
