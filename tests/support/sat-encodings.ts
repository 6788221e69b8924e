/**
 * Questions about structures of one size, laid out as clauses the way the search does it. They are what the solver
 * is measured on and compared with other solvers on: small and hard, satisfiable and not.
 */
import { Points } from "../../lib/carriers/points.ts";
import { and, type Formula, implies, not, or, type RelationSymbol } from "../../lib/logic/formula.ts";
import { Meter } from "../../lib/logic/meter.ts";
import { layOut } from "../../lib/structures/search.ts";
import {
  all,
  asymmetric,
  bothBeaten,
  clique,
  complemented,
  cubeIdentity,
  degree,
  dense,
  differ,
  extension,
  functional,
  graph,
  grid,
  group,
  idempotent,
  interval,
  lattice,
  noAtomsFromBelow,
  notOnto,
  oneCommonNeighbour,
  oneToOne,
  partialOrder,
  pentagon,
  quasigroup,
  R,
  relationR,
  relationS,
  S,
  selfOrthogonal,
  semi,
  serial,
  sharesSuccessor,
  shortIdentity,
  some,
  squareOfS,
  steiner,
  strictOrder,
  T,
  ternary,
  threeBeaten,
  tournament,
  triangleFree,
  twoCommonNeighbours,
  uniqueBetween,
} from "./sat-axioms.ts";

export interface Encoding {
  readonly name: string;
  readonly points: number;
  readonly relations: readonly RelationSymbol[];
  readonly sentences: readonly Formula[];
  /** `hard` takes a solver a tenth of a second or more. */
  readonly level: "small" | "hard";
  /** What is known of it, with the reason; null where only solvers say. */
  readonly expected: { readonly satisfiable: boolean; readonly because: string } | null;
}

export interface EncodedClauses {
  readonly name: string;
  readonly variableCount: number;
  readonly clauses: readonly (readonly number[])[];
}

/** The clauses of an encoding, with the search's own breaking of symmetry. */
export function encode(encoding: Encoding): EncodedClauses {
  const clauses: number[][] = [];
  let variableCount = 0;
  const sink = {
    newVariable: () => ++variableCount,
    addClause: (literals: readonly number[]) => {
      clauses.push([...literals]);
      return true;
    },
  };
  const task = {
    carrier: new Points(encoding.points),
    relations: encoding.relations,
    sentences: encoding.sentences,
  };
  layOut(task, sink, new Meter(1_000_000));
  return { name: `${encoding.name} on ${encoding.points}`, variableCount, clauses };
}

/** Sizes to ask for, and whether there is a structure of the size; null where only solvers say. */
type Sizes = readonly (readonly [points: number, satisfiable: boolean | null])[];

function family(
  name: string,
  sentences: readonly Formula[],
  sizes: { readonly small?: Sizes; readonly hard?: Sizes },
  because = "",
  relations: readonly RelationSymbol[] = [relationR],
): Encoding[] {
  return (["small", "hard"] as const).flatMap((level) =>
    (sizes[level] ?? []).map(([points, satisfiable]) => ({
      name,
      points,
      relations,
      sentences,
      level,
      expected: satisfiable === null ? null : { satisfiable, because },
    })),
  );
}

export const encodings: readonly Encoding[] = [
  ...family(
    "asymmetric, dense, not empty",
    [asymmetric, dense, some("xy", R("x", "y"))],
    {
      small: [
        [6, false],
        [7, true],
        [9, true],
      ],
    },
    "the least such relation has 7 points: exhaustive search",
  ),
  ...family("asymmetric, dense, degree 3", [asymmetric, dense, degree(3)], {
    small: [
      [7, null],
      [8, null],
      [9, null],
      [10, null],
      [11, null],
    ],
  }),
  ...family("asymmetric, one between", [asymmetric, serial, uniqueBetween], {
    small: [
      [7, null],
      [9, null],
      [11, null],
    ],
    hard: [[13, null]],
  }),
  ...family(
    "tournament, any two beaten",
    [...tournament, bothBeaten],
    {
      small: [
        [6, false],
        [7, true],
        [9, true],
      ],
    },
    "Schütte's problem for k = 2: least 7 points (Erdős 1963; E. & G. Szekeres 1965)",
  ),
  ...family(
    "tournament, any three beaten",
    [...tournament, threeBeaten],
    {
      small: [[10, false]],
      hard: [
        [12, false],
        [13, false],
        [14, false],
      ],
    },
    "Schütte's problem for k = 3: least 19 points (E. & G. Szekeres 1965)",
  ),
  ...family(
    "tournament with extensions",
    [...tournament, extension],
    {
      small: [
        [7, true],
        [8, false],
        [9, true],
      ],
    },
    "such tournaments exist from 7 points on, except on 8: exhaustive search",
  ),
  ...family(
    "graph with extensions",
    [...graph, extension],
    {
      small: [
        [8, false],
        [9, true],
        [10, null],
      ],
    },
    "the least graph of this kind has 9 points (Bonato & Cameron 2001; from memory)",
  ),
  ...family(
    "graph, one common neighbour",
    [...graph, all("xy", implies(differ("x", "y"), oneCommonNeighbour("x", "y")))],
    {
      small: [
        [8, false],
        [9, true],
        [10, false],
        [11, true],
      ],
      hard: [
        [14, false],
        [16, false],
      ],
    },
    "friendship graphs are windmills, of odd size (Erdős, Rényi & Sós 1966)",
  ),
  ...family(
    "strongly regular, degree 3",
    [
      ...graph,
      triangleFree,
      degree(3),
      all("xy", implies(and(differ("x", "y"), not(R("x", "y"))), oneCommonNeighbour("x", "y"))),
    ],
    {
      small: [
        [8, false],
        [9, false],
        [10, true],
      ],
    },
    "girth 5 and diameter 2 mean 10 points (Hoffman & Singleton 1960)",
  ),
  ...family(
    "strongly regular, one and two",
    [
      ...graph,
      all("xy", implies(R("x", "y"), oneCommonNeighbour("x", "y"))),
      all("xy", implies(and(differ("x", "y"), not(R("x", "y"))), twoCommonNeighbours("x", "y"))),
    ],
    { small: [[9, true]], hard: [[12, null]] },
    "the lattice graph on 3 × 3 points",
  ),
  ...family(
    "no triangle, no independent four",
    [...graph, triangleFree, clique("abcd", not)],
    {
      small: [
        [8, true],
        [9, false],
      ],
    },
    "R(3, 4) = 9 (Greenwood & Gleason 1955)",
  ),
  ...family(
    "no four alike",
    [...graph, clique("abcd", (edge) => edge), clique("abcd", not)],
    {
      hard: [
        [15, true],
        [16, true],
        [17, true],
      ],
    },
    "R(4, 4) = 18 (Greenwood & Gleason 1955)",
  ),
  ...family(
    "lattice, complemented, not modular",
    [...lattice, complemented, pentagon],
    {
      small: [
        [7, true],
        [8, true],
      ],
      hard: [[10, true]],
    },
    "the pentagon with further complements beside it",
  ),
  ...family(
    "lattice, nothing covers one",
    [...lattice, noAtomsFromBelow, some("xy", differ("x", "y"))],
    {
      small: [
        [6, false],
        [8, false],
      ],
      hard: [
        [12, false],
        [14, false],
      ],
    },
    "an element that covers the least one has one element below it",
  ),
  ...family(
    "order without a last element",
    [...strictOrder, serial],
    {
      small: [
        [6, false],
        [12, false],
      ],
    },
    "a finite order has a maximal element",
  ),
  ...family(
    "directed order, nothing comparable with all",
    [
      ...partialOrder,
      all("xy", some("z", and(R("z", "x"), R("z", "y")))),
      all("x", some("y", and(not(R("x", "y")), not(R("y", "x"))))),
    ],
    {
      small: [
        [6, false],
        [8, false],
      ],
      hard: [
        [12, false],
        [14, false],
        [16, false],
      ],
    },
    "a finite directed order has a least element",
  ),
  ...family(
    "one to one, not onto",
    [functional, serial, oneToOne, notOnto],
    {
      small: [
        [6, false],
        [8, false],
      ],
      hard: [
        [10, false],
        [11, false],
        [12, false],
      ],
    },
    "pigeonhole principle",
  ),
  ...family(
    "interval order, not semi",
    [
      ...strictOrder,
      interval,
      not(semi),
      all(
        "x",
        some(
          "yz",
          and(differ("x", "y", "z"), or(R("x", "y"), R("y", "x")), not(R("x", "z")), not(R("z", "x"))),
        ),
      ),
    ],
    {
      small: [
        [4, null],
        [6, null],
        [8, null],
      ],
    },
  ),
  ...family(
    "grid",
    grid,
    {
      small: [
        [9, true],
        [11, false],
        [12, true],
      ],
      hard: [
        [13, false],
        [17, false],
        [19, false],
      ],
    },
    "the size is a product of two numbers above 1",
    [relationR, relationS],
  ),
  ...family(
    "square is a tournament",
    [...tournament, squareOfS],
    {
      small: [
        [7, null],
        [9, null],
      ],
    },
    "",
    [relationR, relationS],
  ),
  ...family(
    "common successors, degree 3",
    [...graph, triangleFree, degree(3), sharesSuccessor, all("xy", or(not(S("x", "y")), not(S("y", "x"))))],
    {
      small: [[8, null]],
      hard: [
        [9, false],
        [10, null],
      ],
    },
    "degrees of a graph have an even sum",
    [relationR, relationS],
  ),
  ...family(
    "quasigroup ((yx)y)y = x",
    [...quasigroup, idempotent, shortIdentity],
    {
      small: [
        [6, false],
        [7, true],
        [8, true],
        [9, false],
      ],
      hard: [
        [10, false],
        [11, true],
        [12, false],
      ],
    },
    "spectrum of the law (Fujita, Slaney & Bennett 1993)",
    [ternary],
  ),
  ...family(
    "quasigroup ((xy)y)y = x",
    [...quasigroup, idempotent, cubeIdentity],
    { small: [[7, null]], hard: [[10, null]] },
    "",
    [ternary],
  ),
  ...family(
    "quasigroup (xy)(yx) = x",
    [...quasigroup, idempotent, selfOrthogonal],
    {
      small: [
        [6, null],
        [7, null],
        [8, null],
      ],
    },
    "",
    [ternary],
  ),
  ...family(
    "triple system",
    steiner,
    {
      small: [
        [7, true],
        [8, false],
        [9, true],
      ],
      hard: [[11, false]],
    },
    "sizes 1 and 3 modulo 6 (Kirkman 1847)",
    [ternary],
  ),
  ...family(
    "group, not commutative",
    [...group, some("xyz", and(T("x", "y", "z"), not(T("y", "x", "z"))))],
    {
      small: [
        [5, false],
        [6, true],
      ],
      hard: [[7, false]],
    },
    "the least one has 6 elements: textbook",
    [ternary],
  ),
];
