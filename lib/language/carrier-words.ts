/** Domains in words, as they stand in prose: "the integers, a copy at each point of the rational line". */
import type { CarrierDescription, TuplesDescription } from "../logic/structure-definition.ts";
import { listWords } from "./help.ts";

const NUMBERS = "zero one two three four five six seven eight nine ten eleven twelve".split(" ");
const TUPLES = ["single points", "elements", "pairs", "triples", "quadruples"];
const GENERIC = {
  graph: "the generic graph",
  digraph: "the generic directed graph",
  tournament: "the generic tournament",
  "partial-order": "the generic partial order",
} as const;

/**
 * A domain in words that can follow "on": "the rational line in two copies".
 * @param signs whether the signs of number systems are set after their names, as mathematics between dollars: for
 *   Markdown and LaTeX
 */
export function describeCarrier(description: CarrierDescription, signs = false): string {
  const of = (inner: CarrierDescription) => describeCarrier(inner, signs);
  const named = (words: string) => {
    const sign = carrierSign(description, "latex");
    return signs && sign !== null ? `${words} $${sign}$` : words;
  };
  switch (description.kind) {
    case "points":
      return count(description.size, "point");
    case "dense-line": {
      const { colours } = description;
      if (colours === 1) return named("the rational line");
      return `the rational line in ${inWords(colours)} colours, each of them dense`;
    }
    case "integer-line":
      return named("the integers");
    case "half-line":
      return named("the natural numbers");
    case "generic":
      return GENERIC[description.of];
    case "boolean-algebra":
      if (description.zero) return "the atomless Boolean algebra";
      return `the atomless Boolean algebra without its zero${description.top ? "" : " and its top"}`;
    case "dense-tree":
      return "the dense tree with infinitely many branches at each point";
    case "forest": {
      const children =
        description.branching === 1 ? "one child" : `${inWords(description.branching)} children`;
      return description.rooted
        ? `the rooted tree in which every element has ${children}`
        : `the tree in which every element has a parent and ${children}`;
    }
    case "tuples":
      return describeTuples(description, of);
    case "sum":
      return `${listWords(description.parts.map(of))} side by side`;
    case "product": {
      const { inner, outer } = description;
      if (inner.kind === "points") return `${of(inner)} at each point of ${of(outer)}`;
      return `${of(inner)}, a copy at each point of ${of(outer)}`;
    }
  }
}

function describeTuples(
  { over, widths }: TuplesDescription,
  of: (description: CarrierDescription) => string,
): string {
  const copies = widths.filter((width) => width === 1).length;
  const points = widths.filter((width) => width === 0).length;
  if (copies > 0 && copies + points === widths.length) {
    const lines = copies === 1 ? of(over) : `${of(over)} in ${inWords(copies)} copies`;
    const more = points === 1 ? "one more point" : `${inWords(points)} more points`;
    return points === 0 ? lines : `${lines} with ${more}`;
  }
  const kinds = [...new Set(widths)].map((width) => {
    const many = widths.filter((other) => other === width).length;
    if (width === 0) return count(many, "single point");
    const tuples = TUPLES[width] ?? `${width}-tuples`;
    return many === 1 ? `the ${tuples}` : `the ${tuples} in ${inWords(many)} copies`;
  });
  return `${listWords(kinds)} over ${of(over)}`;
}

/**
 * The usual sign of a domain: `ℚ`, `ℚ × ℤ` with the outer component first, `ℕ + ℤ`, `ℚ²`, `{1, 2} × ℚ`; null for domains
 * that have none.
 */
export function carrierSign(description: CarrierDescription, notation: "unicode" | "latex"): string | null {
  const isLatex = notation === "latex";
  const letter = (name: "Q" | "Z" | "N") =>
    isLatex ? `\\mathbb{${name}}` : { Q: "ℚ", Z: "ℤ", N: "ℕ" }[name];
  const times = isLatex ? " \\times " : " × ";
  const of = (inner: CarrierDescription) => {
    const sign = carrierSign(inner, notation);
    const isMade = inner.kind === "tuples" || inner.kind === "sum" || inner.kind === "product";
    return sign !== null && isMade ? `(${sign})` : sign;
  };
  switch (description.kind) {
    case "points":
      return String(description.size);
    case "dense-line":
      return description.colours === 1 ? letter("Q") : null;
    case "integer-line":
      return letter("Z");
    case "half-line":
      return letter("N");
    case "sum": {
      const parts = description.parts.map(of);
      return parts.includes(null) ? null : parts.join(" + ");
    }
    case "product": {
      const [outer, inner] = [of(description.outer), of(description.inner)];
      return outer === null || inner === null ? null : `${outer}${times}${inner}`;
    }
    case "tuples": {
      const { widths } = description;
      const over = of(description.over);
      const [width] = widths;
      if (over === null) return null;
      if (widths.length === 1 && width! > 1)
        return isLatex ? `${over}^{${width}}` : `${over}${superscript(width!)}`;
      if (widths.length === 1 || widths.some((one) => one !== 1)) return null;
      const tags =
        widths.length === 2 ? "1, 2" : isLatex ? `1, \\dots, ${widths.length}` : `1, …, ${widths.length}`;
      return isLatex ? `\\{${tags}\\}${times}${over}` : `{${tags}}${times}${over}`;
    }
    default:
      return null;
  }
}

function superscript(number: number): string {
  return [...String(number)].map((digit) => "⁰¹²³⁴⁵⁶⁷⁸⁹"[Number(digit)]!).join("");
}

function inWords(number: number): string {
  return NUMBERS[number] ?? String(number);
}

function count(number: number, noun: string): string {
  return `${inWords(number)} ${noun}${number === 1 ? "" : "s"}`;
}
