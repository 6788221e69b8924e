/**
 * Samples of infinite carriers: finitely many elements with names, for pictures. A sample is a configuration of its carrier,
 * so that the kinds of the carrier say what holds between its elements.
 */
import { BooleanAlgebra } from "../../lib/carriers/boolean-algebra.ts";
import type { Carrier } from "../../lib/carriers/carrier.ts";
import { DenseLine } from "../../lib/carriers/dense-line.ts";
import { DenseTree } from "../../lib/carriers/dense-tree.ts";
import { Forest } from "../../lib/carriers/forest.ts";
import { BACK, BOTH, FORTH, Generic, NONE } from "../../lib/carriers/generic.ts";
import { HalfLine } from "../../lib/carriers/half-line.ts";
import { IntegerLine } from "../../lib/carriers/integer-line.ts";
import { Points } from "../../lib/carriers/points.ts";
import { Product } from "../../lib/carriers/product.ts";
import { Sum } from "../../lib/carriers/sum.ts";
import { Tuples } from "../../lib/carriers/tuples.ts";
import { enumerate } from "./text.ts";

/** The name of an element, and what is written below it, if anything. */
export interface SampleElement {
  readonly name: string;
  readonly mark: string | null;
}

export interface Sample {
  /** Of all elements in order; no two are the same. */
  readonly configuration: unknown;
  readonly elements: readonly SampleElement[];
  /** Whether the elements stand on one line, in the order of the sample. */
  readonly isRow: boolean;
  /** How the names are to be read; empty where they say it. */
  readonly legend: readonly string[];
}

/** Elements that a sample has at most. */
const MOST_ELEMENTS = 9;

/**
 * A sample of a carrier.
 * @param wanted about how many elements
 * @returns null for carriers of which nothing small gives an idea
 */
export function sampleOf(carrier: Carrier, wanted: number): Sample | null {
  if (carrier instanceof Points) return samplePoints(carrier, wanted);
  if (carrier instanceof DenseLine) return sampleDenseLine(carrier, wanted);
  if (carrier instanceof IntegerLine) return sampleIntegers(carrier, wanted);
  if (carrier instanceof HalfLine) return sampleNaturals(carrier, wanted);
  if (carrier instanceof Tuples) return sampleTuples(carrier);
  if (carrier instanceof Sum) return sampleSum(carrier);
  if (carrier instanceof Product) return sampleProduct(carrier);
  if (carrier instanceof Generic) return sampleGeneric(carrier);
  if (carrier instanceof BooleanAlgebra) return sampleAlgebra(carrier);
  if (carrier instanceof DenseTree) return sampleTree(carrier);
  if (carrier instanceof Forest) return sampleForest(carrier);
  return null;
}

function named(names: readonly string[]): readonly SampleElement[] {
  return names.map((name) => ({ name, mark: null }));
}

const LETTERS = "abcdefghi";

function samplePoints(carrier: Points, wanted: number): Sample {
  const points = Array.from({ length: Math.min(carrier.size, wanted) }, (_, point) => point);
  return {
    configuration: points,
    elements: named(points.map((point) => String(point + 1))),
    isRow: true,
    legend: [],
  };
}

function sampleDenseLine(carrier: DenseLine, wanted: number): Sample {
  const { colours } = carrier.description;
  const each = colours === 1 ? wanted : Math.max(1, Math.floor(MOST_ELEMENTS / colours / 1.5));
  const count = Math.min(MOST_ELEMENTS, colours * each);
  const ranks = Array.from({ length: count }, (_, rank) => rank);
  const names = [...LETTERS].slice(0, count);
  return {
    configuration: { ranks, colours: ranks.map((rank) => rank % colours) },
    elements: names.map((name, rank) => ({
      name,
      mark: colours === 1 ? null : `colour ${(rank % colours) + 1}`,
    })),
    isRow: true,
    // In one piece.
    legend: [`${names.join("\u00a0<\u00a0")} on the line`],
  };
}

function sampleIntegers(carrier: IntegerLine, wanted: number): Sample {
  const count = Math.min(
    MOST_ELEMENTS,
    Math.max(wanted > 3 ? wanted + 1 - (wanted % 2) : wanted, carrier.description.offset + 2),
  );
  const first = -Math.floor((count - 1) / 2);
  const positions = Array.from({ length: count }, (_, index) => index);
  const names = positions.map((position) => String(position + first).replace("-", "−"));
  return { configuration: { positions }, elements: named(names), isRow: true, legend: [] };
}

function sampleNaturals(carrier: HalfLine, wanted: number): Sample {
  const { offset, ends } = carrier.description;
  const count = Math.min(MOST_ELEMENTS, Math.max(wanted, offset + 2, ends + 1));
  const positions = Array.from({ length: count }, (_, index) => index);
  return { configuration: { positions }, elements: named(positions.map(String)), isRow: true, legend: [] };
}

/** For copies, some elements of the line in each; for tuples, those with coordinates among a few elements. */
function sampleTuples(carrier: Tuples): Sample | null {
  const { widths } = carrier.description;
  const widest = Math.max(...widths);
  const copies = widths.filter((width) => width === 1).length;
  const line = sampleOf(carrier.over, widest > 1 ? 2 : copies === 1 ? 4 : copies === 2 ? 3 : 2);
  if (line === null) return null;
  const size = line.elements.length;
  const tags: number[] = [];
  const coordinates: number[] = [];
  const elements: SampleElement[] = [];
  widths.forEach((width, tag) => {
    const isAlone = widths.filter((other) => other === width).length === 1;
    const index = isAlone ? "" : subscript(tag + 1);
    for (let number = 0; number < size ** width && elements.length < MOST_ELEMENTS; number += 1) {
      const tuple = digitsOf(number, size, width);
      tags.push(tag);
      coordinates.push(...tuple);
      const parts = tuple.map((place) => line.elements[place]!.name);
      const body = width === 0 ? "p" : width === 1 ? parts[0]! : `(${parts.join(",")})`;
      elements.push({ name: body + index, mark: width === 1 ? line.elements[tuple[0]!]!.mark : null });
    }
  });
  const places = tags.map((_, place) => place);
  const base = carrier.over.restrict(line.configuration, coordinates);
  const namesOf = (width: number) =>
    places.filter((place) => widths[tags[place]!] === width).map((place) => elements[place]!.name);
  const firsts = namesOf(1).filter((_, place) => place % size === 0);
  const points = namesOf(0);
  return {
    configuration: carrier.restrict({ tags, base }, places),
    elements,
    isRow: widths.length === 1 && widest === 1 && line.isRow,
    legend: [
      ...line.legend,
      ...(copies > 1 ? [`${enumerate(firsts)}: the same place in each copy`] : []),
      ...(points.length > 0
        ? [`${enumerate(points)}: ${points.length === 1 ? "a point by itself" : "points by themselves"}`]
        : []),
    ],
  };
}

/** The digits of a number, so many, the first the highest. */
function digitsOf(number: number, base: number, count: number): readonly number[] {
  const digits: number[] = [];
  for (let rest = number; digits.length < count; rest = Math.floor(rest / base)) digits.unshift(rest % base);
  return digits;
}

function sampleSum(carrier: Sum): Sample | null {
  const each = carrier.parts.length > 2 ? 2 : 3;
  const samples: Sample[] = [];
  for (const part of carrier.parts) {
    const sample = sampleOf(part, each);
    if (sample === null) return null;
    samples.push(sample);
  }
  const parts = samples.flatMap(({ elements }, part) => elements.map(() => part));
  if (parts.length > MOST_ELEMENTS + 3) return null;
  return {
    configuration: { parts, inside: samples.map(({ configuration }) => configuration) },
    elements: samples.flatMap(({ elements }, part) =>
      elements.map(({ name, mark }) => ({ name: `${name}${subscript(part + 1)}`, mark })),
    ),
    isRow: samples.every(({ isRow }) => isRow),
    legend: ["the number below says the part"],
  };
}

/** Few elements of few copies. */
function sampleProduct(carrier: Product): Sample | null {
  const { outer, inner } = carrier;
  const isNarrow = inner.size !== null && inner.size <= 3;
  const places = sampleOf(outer, isNarrow ? 3 : 2);
  const copy = sampleOf(inner, 3);
  if (places === null || copy === null) return null;
  const [many, few] = [places.elements.length, copy.elements.length];
  if (many * few > MOST_ELEMENTS + 3) return null;
  return {
    configuration: {
      groups: places.elements.flatMap((_, group) => copy.elements.map(() => group)),
      outer: places.configuration,
      inside: places.elements.map(() => copy.configuration),
    },
    elements: places.elements.flatMap((place) =>
      copy.elements.map(({ name, mark }) => ({ name: `(${place.name},${name})`, mark: place.mark ?? mark })),
    ),
    isRow: places.isRow && copy.isRow,
    legend: [...places.legend, ...copy.legend],
  };
}

/** How each element stands to those before it: some variety, in few elements. */
const GENERIC_PIECES = {
  graph: [[BOTH], [BOTH, BOTH], [NONE, NONE, BOTH], [NONE, NONE, NONE, BOTH]],
  digraph: [[FORTH], [NONE, BOTH], [NONE, BACK, FORTH]],
  tournament: [[FORTH], [BACK, FORTH], [FORTH, FORTH, BACK]],
  "partial-order": [[NONE], [FORTH, FORTH], [NONE, FORTH, NONE], [NONE, FORTH, NONE, FORTH]],
} as const;

function sampleGeneric(carrier: Generic): Sample {
  const rows: readonly (readonly number[])[] = GENERIC_PIECES[carrier.description.of];
  const codes = rows.flat();
  const count = rows.length + 1;
  const places = Array.from({ length: count }, (_, place) => place);
  return {
    configuration: carrier.restrict({ named: count, codes, name: codes.join("") }, places),
    elements: named([...LETTERS].slice(0, count)),
    isRow: false,
    legend: [],
  };
}

/** What two overlapping elements x and y make; cell 1 is x alone, cell 2 y alone, cell 3 both, cell 0 neither. */
const ALGEBRA_ELEMENTS: readonly (readonly [string, readonly number[]])[] = [
  ["x∖y", [1]],
  ["x∧y", [3]],
  ["y∖x", [2]],
  ["x", [1, 3]],
  ["y", [2, 3]],
  ["x∨y", [1, 2, 3]],
];

function sampleAlgebra(carrier: BooleanAlgebra): Sample {
  const { zero, top } = carrier.description;
  const chosen: readonly (readonly [string, readonly number[]])[] = [
    ...(zero ? [["0", []] as const] : []),
    ...ALGEBRA_ELEMENTS,
    ...(top ? [["1", [0, 1, 2, 3]] as const] : []),
  ];
  const cells = [0, 1, 2, 3]
    .map((cell) => chosen.reduce((sum, [, own], place) => sum + (own.includes(cell) ? 2 ** place : 0), 0))
    .sort((first, second) => first - second);
  const configuration = { named: chosen.length, cells, name: "" };
  return {
    configuration: carrier.restrict(
      configuration,
      chosen.map((_, place) => place),
    ),
    elements: named(chosen.map(([name]) => name)),
    isRow: false,
    legend: ["x and y overlap, and neither is part of the other"],
  };
}

function sampleTree(_carrier: DenseTree): Sample {
  return {
    configuration: { nodes: [0, 1, 2, 3, 4], parents: [-1, 0, 0, 1, 1] },
    elements: named(["a", "b", "c", "d", "e"]),
    isRow: false,
    legend: ["a < b, a < c, b < d and b < e in the tree"],
  };
}

/** Two generations of children at most, with no more than so many drawn of each element. */
const DRAWN_CHILDREN = 3;

function sampleForest(carrier: Forest): Sample {
  const { branching, rooted, offset, ends } = carrier.description;
  const children = Math.min(branching, DRAWN_CHILDREN);
  const most = children === 1 ? Math.min(MOST_ELEMENTS, Math.max(4, offset + 3, ends + 2)) : 7;
  const parents = [-1];
  for (let node = 0; parents.length < most; node += 1)
    for (let child = 0; child < children && parents.length < most; child += 1) parents.push(node);
  const ancestors = (node: number): readonly number[] =>
    node < 0 ? [] : [node, ...ancestors(parents[node]!)];
  const upTo = (from: number, to: number) => {
    const above = ancestors(to);
    return ancestors(from).findIndex((node) => above.includes(node));
  };
  const nodes = parents.map((_, node) => node);
  // In a rooted forest the root comes once more, as the point that all positions are told from.
  const points = rooted ? [0, ...nodes] : nodes;
  const names = nodes.map((node) => (rooted ? (node === 0 ? "0" : LETTERS[node - 1]!) : LETTERS[node]!));
  const parentText = nodes
    .filter((node) => parents.includes(node))
    .map((node) => {
      const own = nodes.filter((child) => parents[child] === node).map((child) => names[child]!);
      return `${names[node]} is the parent of ${enumerate(own)}`;
    });
  return {
    configuration: {
      points: points.length,
      up: points.flatMap((from) => points.map((to) => upTo(from, to))),
    },
    elements: named(names),
    isRow: children === 1,
    legend: parentText.slice(0, children === 1 ? 0 : 3),
  };
}

function subscript(number: number): string {
  return [...String(number)].map((digit) => "₀₁₂₃₄₅₆₇₈₉"[Number(digit)]!).join("");
}
