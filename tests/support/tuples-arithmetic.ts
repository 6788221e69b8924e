/**
 * Sentences about relations defined on tagged tuples of numbers, as SMT-LIB problems of linear arithmetic: an element
 * with a tag is as many numbers as the tag is wide, and a quantifier goes through the tags.
 */
import type { Formula } from "../../lib/logic/formula.ts";
import type {
  CarrierAtom,
  CarrierFormula,
  DefinedRelation,
  ElementTerm,
  TuplesDescription,
} from "../../lib/logic/structure-definition.ts";

/** An element while a problem is written: its tag and the constants for its coordinates. */
interface Element {
  readonly tag: number;
  readonly coordinates: readonly string[];
}
type Elements = Readonly<Record<string, Element>>;

/** The problem that is satisfiable if and only if the sentence is true. Tuples are over a line. */
export function arithmeticOf(
  { over, widths }: TuplesDescription,
  defined: DefinedRelation,
  sentence: Formula,
): string {
  const sort = over.kind === "dense-line" ? "Real" : "Int";
  let names = 0;
  return `(assert ${write(sentence, {})})`;

  function write(formula: Formula, elements: Elements): string {
    const part = (inner: Formula) => write(inner, elements);
    switch (formula.kind) {
      case "true":
      case "false":
        return formula.kind;
      case "atom":
        return writeCarrierFormula(
          defined.formula,
          Object.fromEntries(
            defined.variables.map((variable, place) => [variable, elements[formula.args[place]!]!]),
          ),
        );
      case "equal":
        return writeSame(elements[formula.left]!, elements[formula.right]!);
      case "not":
        return `(not ${part(formula.body)})`;
      case "and":
      case "or":
        return `(${formula.kind} ${formula.parts.map(part).join(" ")})`;
      case "implies":
        return `(=> ${part(formula.left)} ${part(formula.right)})`;
      case "iff":
        return `(= ${part(formula.left)} ${part(formula.right)})`;
      case "forall":
      case "exists": {
        const cases = widths.map((width, tag) => {
          const coordinates = Array.from({ length: width }, () => `c${names++}`);
          const body = write(formula.body, { ...elements, [formula.variable]: { tag, coordinates } });
          if (width === 0) return body;
          const bound = coordinates.map((name) => `(${name} ${sort})`).join(" ");
          if (over.kind !== "half-line") return `(${formula.kind} (${bound}) ${body})`;
          const natural = coordinates.map((name) => `(>= ${name} 0)`).join(" ");
          const guarded =
            formula.kind === "forall" ? `(=> (and ${natural}) ${body})` : `(and ${natural} ${body})`;
          return `(${formula.kind} (${bound}) ${guarded})`;
        });
        return `(${formula.kind === "forall" ? "and" : "or"} ${cases.join(" ")})`;
      }
    }
  }
}

function writeSame(left: Element, right: Element): string {
  if (left.tag !== right.tag) return "false";
  return `(and true ${left.coordinates.map((name, place) => `(= ${name} ${right.coordinates[place]!})`).join(" ")})`;
}

function writeCarrierFormula(formula: CarrierFormula, elements: Elements): string {
  const part = (inner: CarrierFormula) => writeCarrierFormula(inner, elements);
  switch (formula.kind) {
    case "true":
    case "false":
      return formula.kind;
    case "not":
      return `(not ${part(formula.body)})`;
    case "and":
    case "or":
      return `(${formula.kind} ${formula.parts.map(part).join(" ")})`;
    case "implies":
      return `(=> ${part(formula.left)} ${part(formula.right)})`;
    case "iff":
      return `(= ${part(formula.left)} ${part(formula.right)})`;
    default:
      return writeAtom(formula, elements);
  }
}

function writeAtom(atom: CarrierAtom, elements: Elements): string {
  if (atom.kind === "label") {
    if (atom.of.kind !== "element" || atom.name !== "copy") throw new Error("not of tuples over a line");
    return String(elements[atom.of.variable]!.tag === atom.value - 1);
  }
  if (atom.kind !== "compare") throw new Error("not of tuples over a line");
  const { left, relation, right } = atom;
  if (left.kind === "element" && left.path.length === 0) {
    if (relation !== "=" || right.kind !== "element")
      throw new Error("whole tuples are only said to be the same");
    return writeSame(elements[left.variable]!, elements[right.variable]!);
  }
  const [first, second] = [writeTerm(left, elements), writeTerm(right, elements)];
  if (first === null || second === null) return "false";
  return `(${relation === "≤" ? "<=" : relation} ${first} ${second})`;
}

/** Null when there is no such coordinate. */
function writeTerm(term: ElementTerm, elements: Elements): string | null {
  switch (term.kind) {
    case "number":
      return writeNumber(term.value);
    case "element":
      return elements[term.variable]!.coordinates[(term.path[0] as number) - 1] ?? null;
    case "shift": {
      const of = writeTerm(term.of, elements);
      return of === null ? null : `(+ ${of} ${writeNumber(term.by)})`;
    }
    case "apply":
      throw new Error("not of tuples over a line");
  }
}

function writeNumber(value: number): string {
  return value < 0 ? `(- ${-value})` : String(value);
}
