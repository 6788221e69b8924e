/** The words for infinite domains and for what can be said of their elements, for messages, completion and inspection. */

export interface CarrierHelp {
  /** The words that it begins with. */
  readonly word: string;
  /** How it is written. */
  readonly form: string;
  /** What it is, and what can be said of its elements, in sentences. */
  readonly meaning: string;
}

/** Carriers that stand by themselves, and those made of others. */
export const carrierHelp: readonly CarrierHelp[] = [
  {
    word: "dense-line",
    form: "dense-line, dense-line in 2 colours",
    meaning:
      "The rational numbers in their order: `x < y`; in colours, each of them dense in the line: `colour(x) = 1`.",
  },
  {
    word: "integer-line",
    form: "integer-line",
    meaning: "The integers in their order, with steps: `x < y`, `y = x + 1`.",
  },
  {
    word: "half-line",
    form: "half-line",
    meaning: "The natural numbers, from 0 on, in their order, with steps: `x < y`, `y = x + 1`, `x = 0`.",
  },
  {
    word: "generic graph",
    form: "generic graph",
    meaning:
      "The countable graph in which every finite graph can be found, and extended in every way: `adjacent(x, y)`.",
  },
  {
    word: "generic digraph",
    form: "generic digraph",
    meaning:
      "The countable directed graph, possibly with arcs both ways, in which every finite one can be found, and extended in every way: `arc(x, y)`.",
  },
  {
    word: "generic tournament",
    form: "generic tournament",
    meaning:
      "The countable tournament in which every finite one can be found, and extended in every way: `beats(x, y)`.",
  },
  {
    word: "generic partial-order",
    form: "generic partial-order",
    meaning:
      "The countable partial order in which every finite one can be found, and extended in every way: `x < y`.",
  },
  {
    word: "boolean-algebra",
    form: "boolean-algebra, boolean-algebra without zero, boolean-algebra without zero and top",
    meaning:
      "The countable Boolean algebra without atoms, with its zero and its top or without: `x ≤ y`, `meet(x, y) = 0`, `join(x, y)`, `co(x)`.",
  },
  {
    word: "dense-tree",
    form: "dense-tree",
    meaning:
      "The countable tree in which what lies below a point is a dense line, and every point is one where infinitely many branches part: `x < y`, `meet(x, y)`.",
  },
  {
    word: "tree",
    form: "tree with 2 children",
    meaning: "Every element has a parent and so many children: `parent(y) = x`. Also written `forest`.",
  },
  {
    word: "rooted tree",
    form: "rooted tree with 2 children",
    meaning:
      "Every element but the root has a parent, and all have so many children: `parent(y) = x`; `x = 0` says that x is the root, `x = 2` that it is two steps from it. Also written `rooted forest`.",
  },
  {
    word: "tuples",
    form: "tuples (a, b) over dense-line, tuples of 2 over dense-line, tuples of 2, 1 over dense-line",
    meaning:
      "The tuples of so many elements of another carrier: `x.a < y.b`, or by number `x.1 < y.2`; of several lengths side by side: `copy(x) = 2`.",
  },
  {
    word: "copies",
    form: "2 copies of integer-line, 1 copy of dense-line with 1 point",
    meaning:
      "Copies of another carrier, and single points beside them: `copy(x) = 1` says in which x is, and `x.1` is the element that x is a copy of.",
  },
  {
    word: "sum",
    form: "sum of half-line and points 1",
    meaning: "The elements of several carriers: `part(x) = 1`, and within a part what can be said there.",
  },
  {
    word: "at each point of",
    form: "integer-line at each point of dense-line",
    meaning:
      "A copy of the first carrier at every element of the second: `x.outer` is the element at which the copy is, `x.inner` the place in it.",
  },
];

/** What can be said of elements, by the words that say it. */
export const elementHelp: readonly CarrierHelp[] = [
  {
    word: "colour",
    form: "colour(x) = 1",
    meaning: "The number of the colour of an element of a line in colours.",
  },
  {
    word: "copy",
    form: "copy(x) = 1",
    meaning: "The number of the copy, or of the length of tuples, of an element.",
  },
  { word: "part", form: "part(x) = 1", meaning: "The number of the part of a sum that an element is in." },
  {
    word: "adjacent",
    form: "adjacent(x, y)",
    meaning: "Two elements of the generic graph are joined by an edge.",
  },
  {
    word: "arc",
    form: "arc(x, y)",
    meaning: "An arc leads from one element of the generic digraph to the other.",
  },
  {
    word: "beats",
    form: "beats(x, y)",
    meaning: "The one element of the generic tournament beats the other.",
  },
  {
    word: "meet",
    form: "meet(x, y)",
    meaning:
      "The greatest element below both, in a dense tree or a Boolean algebra; in one without zero there may be none.",
  },
  { word: "join", form: "join(x, y)", meaning: "The least element above both, in a Boolean algebra." },
  {
    word: "co",
    form: "co(x)",
    meaning: "The complement of an element of a Boolean algebra; of a relation, where it does not hold.",
  },
  {
    word: "parent",
    form: "parent(x)",
    meaning: "The parent of an element of a tree; that of the root is equal to nothing but itself.",
  },
  {
    word: "outer",
    form: "x.outer",
    meaning: "In `A at each point of B`, the element of B at which the copy is that x is in.",
  },
  {
    word: "inner",
    form: "x.inner",
    meaning: "In `A at each point of B`, the element of A that x is a copy of.",
  },
];

/** The words with which a carrier may begin that stands by itself. */
export const SIMPLE_CARRIERS = [
  "dense-line",
  "integer-line",
  "half-line",
  "boolean-algebra",
  "dense-tree",
] as const;
