/**
 * What definitions may say of points where they are components of other carriers: they are the numbers 1, …, n, so that
 * `x = 2`, `x < y` and `y = x + 1` are said of them as of numbers. A sum that is no point is less than or greater than some. `copy(x) = 2` says the same as
 * `x = 2`, where beside points there are lines of which the latter would be said too.
 */
import { type NamedElement, termsOf } from "../../logic/carrier-formulas.ts";
import type { CarrierAtom, ElementTerm } from "../../logic/structure-definition.ts";
import type { Points, PointsConfiguration } from "../points.ts";
import { compare, complain, element, firstComplaint, number, pairsOf } from "./terms.ts";
import type { Complaint, Vocabulary } from "./vocabulary.ts";

/** The vocabulary of a finite domain. */
export function pointsVocabulary(carrier: Points): Vocabulary<PointsConfiguration> {
  const { size } = carrier;
  return {
    complaint(atom) {
      if (isCopy(atom)) return termComplaint(atom.of, size) ?? termComplaint(number(atom.value), size);
      if (atom.kind !== "compare")
        return complain(`\`${atom.name}\` says nothing of points`, "a comparison, as in `x = 1` or `x < y`");
      const terms = termsOf(atom);
      if (terms.every((term) => numberIn(term)))
        return complain("this says nothing of a point", "a comparison with a point, as in `x = 1`");
      return firstComplaint(atom, (term) => termComplaint(term, size));
    },
    holds(atom, configuration, place) {
      if (isCopy(atom)) {
        return configuration[place(atom.of.variable)] === atom.value - 1;
      }
      if (atom.kind !== "compare") throw new Error(`${atom.name} on points`);
      const value = (term: ElementTerm): number => {
        if (term.kind === "element") return configuration[place(term.variable)]! + 1;
        if (term.kind === "number") return term.value;
        if (term.kind === "shift") return value(term.of) + term.by;
        throw new Error(`${term.name} on points`);
      };
      const [left, right] = [value(atom.left), value(atom.right)];
      if (atom.relation === "=") return left === right;
      return atom.relation === "<" ? left < right : left <= right;
    },
    atoms(variables) {
      const pairs = pairsOf(variables.map(element));
      const numbers = Array.from({ length: size === 1 ? 0 : size }, (_, point) => number(point + 1));
      return [
        ...pairs.map(([x, y]) => compare(x, "=", y)),
        ...variables.flatMap((x) => numbers.map((value) => compare(element(x), "=", value))),
        ...pairs.flatMap(([x, y]) => [compare(x, "<", y), compare(y, "<", x)]),
        ...variables.flatMap((x) =>
          Array.from({ length: size === 1 ? 0 : size }, (_, point) => copyOf(element(x), point + 1)),
        ),
      ];
    },
  };
}

/** In which copy of a point a point is. */
type Copy = CarrierAtom & { readonly kind: "label"; readonly of: NamedElement };

function isCopy(atom: CarrierAtom): atom is Copy {
  return atom.kind === "label" && atom.name === "copy" && atom.of.kind === "element";
}

function copyOf(of: NamedElement, value: number): Copy {
  return { kind: "label", name: "copy", of, value };
}

function numberIn(term: ElementTerm): boolean {
  return term.kind === "number" || (term.kind === "shift" && numberIn(term.of));
}

function termComplaint(term: ElementTerm, size: number): Complaint | null {
  switch (term.kind) {
    case "element":
      return term.path.length === 0
        ? null
        : complain("points have no components", `\`${term.variable}\` itself`);
    case "number":
      return Number.isInteger(term.value) && term.value >= 1 && term.value <= size
        ? null
        : complain(
            size === 1
              ? `there is the point 1 here, and no ${term.value}`
              : `there are the points 1 to ${size} here, and no ${term.value}`,
            null,
          );
    case "shift":
      return termComplaint(term.of, size);
    case "apply":
      return complain(`\`${term.name}\` says nothing of points`, null);
  }
}
