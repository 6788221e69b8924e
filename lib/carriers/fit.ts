/** Bounds of carriers (offsets, ends) chosen from what definitions say, so that nobody has to write them. */
import { elementsOf, mapElements } from "../logic/carrier-formulas.ts";
import type { CarrierAtom, CarrierDescription } from "../logic/structure-definition.ts";
import { neededEnds, neededOffset } from "./vocabulary/lines.ts";
import { neededForestBounds } from "./vocabulary/trees.ts";

/**
 * The description with the least bounds with which its kinds decide each of the atoms, those given ignored. Atoms that
 * say nothing on the carrier, or on a component, need none there.
 */
export function fitCarrier(
  description: CarrierDescription,
  atoms: readonly CarrierAtom[],
): CarrierDescription {
  const plain = atoms.filter((atom) => elementsOf(atom).every(({ path }) => path.length === 0));
  switch (description.kind) {
    case "integer-line":
      return { ...description, offset: neededOffset(plain) };
    case "half-line":
      return { ...description, offset: neededOffset(plain), ends: neededEnds(plain) };
    case "forest":
      return { ...description, ...neededForestBounds(plain) };
    case "tuples": {
      const inside = ofComponents(atoms, (step) => typeof step === "number");
      return { ...description, over: fitCarrier(description.over, inside) };
    }
    case "sum":
      return { ...description, parts: description.parts.map((part) => fitCarrier(part, atoms)) };
    case "product":
      return {
        ...description,
        outer: fitCarrier(
          description.outer,
          ofComponents(atoms, (step) => step === "outer"),
        ),
        inner: fitCarrier(
          description.inner,
          ofComponents(atoms, (step) => step === "inner"),
        ),
      };
    default:
      return description;
  }
}

/** The greatest of the bounds of a carrier and its components; 0 when it has none. */
export function largestBound(description: CarrierDescription): number {
  switch (description.kind) {
    case "integer-line":
      return description.offset;
    case "half-line":
    case "forest":
      return Math.max(description.offset, description.ends);
    case "tuples":
      return largestBound(description.over);
    case "sum":
      return Math.max(...description.parts.map(largestBound));
    case "product":
      return Math.max(largestBound(description.outer), largestBound(description.inner));
    default:
      return 0;
  }
}

/** The atoms that are about components of one sort alone, each component a variable of its own. */
function ofComponents(
  atoms: readonly CarrierAtom[],
  leads: (step: number | "outer" | "inner" | undefined) => boolean,
): readonly CarrierAtom[] {
  return atoms
    .filter((atom) => {
      const elements = elementsOf(atom);
      return elements.length > 0 && elements.every(({ path }) => leads(path[0]));
    })
    .map((atom) =>
      mapElements(atom, ({ variable, path: [step, ...path] }) => ({
        kind: "element",
        variable: `${variable}.${step}`,
        path,
      })),
    );
}
