/**
 * What definitions may say of elements of carriers made of others. A path leads to a component: `x.1` is the first
 * coordinate of a tuple, `x.outer` and `x.inner` are the components of an element of a product; an element of a sum is
 * an element of its part and has no path of its own. Of whole elements it may be said that they are the same, and in which
 * copy (tag) or part they are; everything else is said of components in the words of their carrier.
 *
 * To the vocabulary of the component a component is a variable: `x.1` is the variable with that name. So its complaints
 * read as the user wrote them.
 */
import { elementsOf, mapElements, type NamedElement } from "../../logic/carrier-formulas.ts";
import type { CarrierAtom, ElementTerm } from "../../logic/structure-definition.ts";
import type { Carrier } from "../carrier.ts";
import { placeInside } from "../groups.ts";
import type { Product, ProductConfiguration } from "../product.ts";
import { Sum, type SumConfiguration } from "../sum.ts";
import type { Tuples, TuplesConfiguration } from "../tuples.ts";
import { type Comparison, compare, complain, element, pairsOf } from "./terms.ts";
import type { Complaint, Vocabulary } from "./vocabulary.ts";

/** The vocabulary of any carrier; handed in because it knows those here. */
type VocabularyOf = (carrier: Carrier) => Vocabulary<unknown>;
/** The beginning of a path. */
type Step = NamedElement["path"][number];

/** The vocabulary of tagged tuples. */
export function tuplesVocabulary(carrier: Tuples, of: VocabularyOf): Vocabulary<TuplesConfiguration> {
  const { widths } = carrier.description;
  const widest = Math.max(...widths);
  const within = of(carrier.over);
  return {
    complaint(atom) {
      if (isLabel(atom, "copy"))
        return widths.length === 1
          ? complain("the tuples here are in one copy only", null)
          : rangeComplaint("copies", atom.value, widths.length);
      if (isIdentity(atom)) return null;
      const elements = elementsOf(atom);
      if (elements.length === 0) return nothingSaid;
      for (const { variable, path } of elements) {
        const [step] = path;
        if (widest === 0)
          return complain("the elements here are single points, which have no coordinates", "`=` and copies");
        if (step === undefined)
          return complain(
            `\`${variable}\` is a tuple here, and this says something of its coordinates only`,
            `\`${variable}.1\``,
          );
        if (typeof step !== "number" || !Number.isInteger(step) || step < 1 || step > widest)
          return complain(
            `the tuples here have ${widest === 1 ? "one coordinate, 1" : `the coordinates 1 to ${widest}`}, and no \`${step}\``,
            `\`${variable}.1\``,
          );
      }
      return within.complaint(inComponents(atom).atom);
    },
    holds(atom, configuration, place) {
      const { tags, base } = configuration;
      if (isLabel(atom, "copy")) return tags[place(variableOf(atom.of))] === atom.value - 1;
      if (isIdentity(atom)) return areSame(carrier, atom, configuration, place);
      const { atom: inside, components } = inComponents(atom);
      for (const { variable, step } of components.values())
        if ((step as number) > widths[tags[place(variable)]!]!) return false;
      return within.holds(inside, base, (name) => {
        const { variable, step } = components.get(name)!;
        return carrier.coordinatesOf(configuration, place(variable))[(step as number) - 1]!;
      });
    },
    atoms(variables) {
      const coordinates = Array.from({ length: widest }, (_, index) => index + 1);
      return [
        ...identities(variables),
        ...(widths.length === 1 ? [] : labels(variables, "copy", widths.length)),
        ...componentAtoms(within, variables, coordinates),
      ];
    },
  };
}

/**
 * The vocabulary of a sum. Its atoms leave out what is unsettled in some part, so that they tell all kinds apart when
 * lines, and forests, that are parts have the same bounds.
 */
export function sumVocabulary(carrier: Sum, of: VocabularyOf): Vocabulary<SumConfiguration> {
  const within = carrier.parts.map(of);
  return {
    complaint(atom) {
      if (isLabel(atom, "part")) return rangeComplaint("parts", atom.value, partCount(carrier));
      if (isIdentity(atom)) return null;
      if (elementsOf(atom).length === 0) return nothingSaid;
      const complaints = within.map((vocabulary) => vocabulary.complaint(atom));
      // Where it says something that kinds do not tell, it must not count as false.
      const unsettled = complaints.find((complaint) => complaint?.isUnsettled === true);
      if (unsettled !== undefined) return unsettled;
      return complaints.includes(null) ? null : complaints[0]!;
    },
    holds(atom, configuration, place) {
      const { parts, inside } = configuration;
      if (isLabel(atom, "part"))
        return partNumber(carrier, configuration, place(variableOf(atom.of))) === atom.value;
      if (isIdentity(atom)) return areSame(carrier, atom, configuration, place);
      const places = elementsOf(atom).map(({ variable }) => place(variable));
      const part = parts[places[0]!]!;
      const vocabulary = within[part]!;
      if (places.some((one) => parts[one] !== part) || vocabulary.complaint(atom) !== null) return false;
      return vocabulary.holds(atom, inside[part], (variable) => placeInside(parts, place(variable)));
    },
    atoms(variables) {
      const own = [...identities(variables), ...labels(variables, "part", partCount(carrier))];
      const seen = new Set(own.map((atom) => JSON.stringify(atom)));
      const others = within.flatMap((vocabulary) =>
        vocabulary.atoms(variables).filter((atom) => {
          const text = JSON.stringify(atom);
          if (isLabel(atom, "part") || seen.has(text)) return false;
          seen.add(text);
          return within.every((other) => other.complaint(atom)?.isUnsettled !== true);
        }),
      );
      return [...own, ...others];
    },
  };
}

/** The vocabulary of a product. */
export function productVocabulary(carrier: Product, of: VocabularyOf): Vocabulary<ProductConfiguration> {
  const outer = of(carrier.outer);
  const inner = of(carrier.inner);
  return {
    complaint(atom) {
      if (isIdentity(atom)) return null;
      const elements = elementsOf(atom);
      if (elements.length === 0) return nothingSaid;
      for (const { variable, path } of elements) {
        const suggestion = `\`${variable}.outer\` or \`${variable}.inner\``;
        const [step] = path;
        if (step === undefined)
          return complain(
            `\`${variable}\` has two components here, and this says something of one of them only`,
            suggestion,
          );
        if (step !== "outer" && step !== "inner")
          return complain(
            `the elements here have the components outer and inner, and no \`${step}\``,
            suggestion,
          );
      }
      const steps = new Set(elements.map(({ path }) => path[0]));
      if (steps.size > 1)
        return complain(
          "outer and inner components have nothing to do with each other",
          "a formula for each",
        );
      return (steps.has("outer") ? outer : inner).complaint(inComponents(atom).atom);
    },
    holds(atom, configuration, place) {
      if (isIdentity(atom)) return areSame(carrier, atom, configuration, place);
      const { groups } = configuration;
      const { atom: inside, components } = inComponents(atom);
      const placeOf = (name: string) => place(components.get(name)!.variable);
      const [first] = components.keys();
      const copy = groups[placeOf(first!)]!;
      if (components.get(first!)!.step === "outer")
        return outer.holds(inside, configuration.outer, (name) => groups[placeOf(name)]!);
      if ([...components.keys()].some((name) => groups[placeOf(name)] !== copy)) return false;
      return inner.holds(inside, configuration.inside[copy], (name) => placeInside(groups, placeOf(name)));
    },
    atoms: (variables) => [
      ...identities(variables),
      ...componentAtoms(outer, variables, ["outer"]),
      ...componentAtoms(inner, variables, ["inner"]),
    ],
  };
}

const nothingSaid = complain("this says nothing of an element", null);

/** An atom about components that are variables to it, and which components these are. */
interface InComponents {
  readonly atom: CarrierAtom;
  readonly components: ReadonlyMap<string, { readonly variable: string; readonly step: Step }>;
}

/** What is remembered of atoms, since the same are asked about on many configurations. */
const remembered = new WeakMap<CarrierAtom, InComponents>();

/** The atom about the components that its paths begin with; all have paths. */
function inComponents(atom: CarrierAtom): InComponents {
  let found = remembered.get(atom);
  if (found === undefined) {
    const components = new Map<string, { readonly variable: string; readonly step: Step }>();
    const inside = mapElements(atom, ({ variable, path: [step, ...path] }) => {
      const name = nameOf(variable, step!);
      components.set(name, { variable, step: step! });
      return { kind: "element", variable: name, path };
    });
    found = { atom: inside, components };
    remembered.set(atom, found);
  }
  return found;
}

/** The atoms of a component's vocabulary, about the components of the variables that the steps lead to. */
function componentAtoms(
  vocabulary: Vocabulary<unknown>,
  variables: readonly string[],
  steps: readonly Step[],
): readonly CarrierAtom[] {
  const components = new Map(
    variables.flatMap((variable) =>
      steps.map((step) => [nameOf(variable, step), { variable, step }] as const),
    ),
  );
  return vocabulary.atoms([...components.keys()]).map((atom) =>
    mapElements(atom, ({ variable: name, path }) => {
      const { variable, step } = components.get(name)!;
      return { kind: "element", variable, path: [step, ...path] };
    }),
  );
}

function nameOf(variable: string, step: Step): string {
  return `${variable}.${step}`;
}

/** Whether an atom says in which copy or part an element, not a component of one, is. */
function isLabel(atom: CarrierAtom, name: "copy" | "part"): atom is CarrierAtom & { readonly kind: "label" } {
  return (
    atom.kind === "label" && atom.name === name && atom.of.kind === "element" && atom.of.path.length === 0
  );
}

/** Whether an atom says that two elements are the same, not components of them. */
function isIdentity(atom: CarrierAtom): atom is Comparison {
  return (
    atom.kind === "compare" &&
    atom.relation === "=" &&
    [atom.left, atom.right].every((term) => term.kind === "element" && term.path.length === 0)
  );
}

function areSame<Configuration>(
  carrier: Carrier<Configuration>,
  { left, right }: Comparison,
  configuration: Configuration,
  place: (variable: string) => number,
): boolean {
  return carrier.same(configuration, place(variableOf(left)), place(variableOf(right)));
}

function variableOf(term: ElementTerm): string {
  if (term.kind !== "element") throw new Error("an element is meant");
  return term.variable;
}

/** How many parts are told apart: of a part that is a sum, its parts. */
function partCount(carrier: Carrier): number {
  return carrier instanceof Sum ? carrier.parts.reduce((count, part) => count + partCount(part), 0) : 1;
}

/** The part in which an element is, counted from 1, those of parts that are sums too. */
function partNumber(carrier: Carrier, configuration: unknown, place: number): number {
  if (!(carrier instanceof Sum)) return 1;
  const { parts, inside } = configuration as SumConfiguration;
  const part = parts[place]!;
  const before = carrier.parts.slice(0, part).reduce((count, one) => count + partCount(one), 0);
  return before + partNumber(carrier.parts[part]!, inside[part], placeInside(parts, place));
}

function identities(variables: readonly string[]): readonly CarrierAtom[] {
  return pairsOf(variables).map(([x, y]) => compare(element(x), "=", element(y)));
}

function labels(variables: readonly string[], name: "copy" | "part", count: number): readonly CarrierAtom[] {
  const values = Array.from({ length: count }, (_, index) => index + 1);
  return variables.flatMap((variable) =>
    values.map((value): CarrierAtom => ({ kind: "label", name, of: element(variable), value })),
  );
}

function rangeComplaint(plural: "copies" | "parts", value: number, count: number): Complaint | null {
  if (Number.isInteger(value) && value >= 1 && value <= count) return null;
  return complain(`there are the ${plural} 1 to ${count} here, and no ${value}`, null);
}
