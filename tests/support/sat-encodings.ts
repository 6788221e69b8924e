/**
 * Questions about structures of one size, laid out as clauses the way the search does it. They are what the solver
 * is measured on and compared with other solvers on: small and hard, satisfiable and not.
 */
import { Points } from "../../lib/carriers/points.ts";
import {
  and,
  atom,
  equal,
  exists,
  type Formula,
  forall,
  iff,
  implies,
  not,
  or,
  type RelationSymbol,
} from "../../lib/logic/formula.ts";
import { Meter } from "../../lib/logic/meter.ts";
import { layOut } from "../../lib/structures/search.ts";

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

const binary = (name: string): RelationSymbol => ({ name, places: 2, infix: false });
const relationR = binary("R");
const relationS = binary("S");
const ternary: RelationSymbol = { name: "T", places: 3, infix: false };

const R = (x: string, y: string) => atom(relationR, x, y);
const S = (x: string, y: string) => atom(relationS, x, y);
const T = (x: string, y: string, z: string) => atom(ternary, x, y, z);
const all = (variables: string, body: Formula) => forall([...variables], body);
const some = (variables: string, body: Formula) => exists([...variables], body);
const differ = (...variables: string[]) =>
  and(...variables.flatMap((x, i) => variables.slice(i + 1).map((y) => not(equal(x, y)))));

// Properties of R

const irreflexive = all("x", not(R("x", "x")));
const reflexive = all("x", R("x", "x"));
const symmetric = all("xy", implies(R("x", "y"), R("y", "x")));
const asymmetric = all("xy", implies(R("x", "y"), not(R("y", "x"))));
const antisymmetric = all("xy", implies(and(R("x", "y"), R("y", "x")), equal("x", "y")));
const transitive = all("xyz", implies(and(R("x", "y"), R("y", "z")), R("x", "z")));
const total = all("xy", or(R("x", "y"), R("y", "x"), equal("x", "y")));
const serial = all("x", some("y", R("x", "y")));
const dense = all("xz", implies(R("x", "z"), some("y", and(R("x", "y"), R("y", "z")))));
const triangleFree = all("xyz", not(and(R("x", "y"), R("y", "z"), R("x", "z"))));
const partialOrder = [reflexive, antisymmetric, transitive];
const strictOrder = [irreflexive, transitive];
const graph = [irreflexive, symmetric];
const tournament = [asymmetric, total];

const least = (z: string, bound: (w: string) => Formula, down: (a: string, b: string) => Formula) =>
  and(bound(z), all("w", implies(bound("w"), down(z, "w"))));
const joins = all(
  "xy",
  some(
    "z",
    least("z", (w) => and(R("x", w), R("y", w)), R),
  ),
);
const meets = all(
  "xy",
  some(
    "z",
    least(
      "z",
      (w) => and(R(w, "x"), R(w, "y")),
      (a, b) => R(b, a),
    ),
  ),
);
const lattice = [...partialOrder, joins, meets];
/** Five points as in the pentagon: o below all, i above all, a below b, c beside both. */
const pentagon = some(
  "abc",
  and(
    R("a", "b"),
    differ("a", "b"),
    all(
      "w",
      and(
        iff(and(R("w", "a"), R("w", "c")), and(R("w", "b"), R("w", "c"))),
        iff(and(R("a", "w"), R("c", "w")), and(R("b", "w"), R("c", "w"))),
      ),
    ),
  ),
);
const complemented = all(
  "x",
  some(
    "y",
    all(
      "z",
      and(
        implies(and(R("z", "x"), R("z", "y")), all("w", R("z", "w"))),
        implies(and(R("x", "z"), R("y", "z")), all("w", R("w", "z"))),
      ),
    ),
  ),
);
const noAtomsFromBelow = all(
  "x",
  implies(
    some("y", and(R("y", "x"), differ("x", "y"))),
    some("yz", and(R("y", "x"), R("z", "x"), differ("x", "y", "z"), not(R("y", "z")), not(R("z", "y")))),
  ),
);

const commonNeighbour = (x: string, y: string, z: string) => and(R(x, z), R(y, z));
const oneCommonNeighbour = (x: string, y: string) =>
  some("z", and(commonNeighbour(x, y, "z"), all("w", implies(commonNeighbour(x, y, "w"), equal("w", "z")))));
const twoCommonNeighbours = (x: string, y: string) =>
  some(
    "zv",
    and(differ("z", "v"), all("w", iff(commonNeighbour(x, y, "w"), or(equal("w", "z"), equal("w", "v"))))),
  );
const degree = (count: number) => {
  const names = ["a", "b", "c", "d", "e", "f"].slice(0, count);
  return all(
    "x",
    exists(
      names,
      and(
        ...(count > 1 ? [differ(...names)] : []),
        all("w", iff(R("x", "w"), or(...names.map((name) => equal("w", name))))),
      ),
    ),
  );
};
const clique = (variables: string, sign: (f: Formula) => Formula) =>
  all(
    variables,
    implies(
      differ(...variables),
      not(and(...[...variables].flatMap((x, i) => [...variables.slice(i + 1)].map((y) => sign(R(x, y)))))),
    ),
  );
const bothBeaten = all("xy", some("z", and(R("z", "x"), R("z", "y"), differ("z", "x"), differ("z", "y"))));
/** For any two points, every way to be joined to them occurs. */
const extension = all(
  "xy",
  implies(
    differ("x", "y"),
    and(
      ...[0, 1, 2, 3].map((ways) =>
        some(
          "z",
          and(
            differ("z", "x"),
            differ("z", "y"),
            (ways & 1) === 0 ? R("z", "x") : not(R("z", "x")),
            (ways & 2) === 0 ? R("z", "y") : not(R("z", "y")),
          ),
        ),
      ),
    ),
  ),
);

// An operation as a three-place relation: T(x, y, z) is x·y = z

const operation = [
  all("xy", some("z", T("x", "y", "z"))),
  all("xyzw", implies(and(T("x", "y", "z"), T("x", "y", "w")), equal("z", "w"))),
];
const quasigroup = [
  ...operation,
  all("xyzw", implies(and(T("x", "z", "y"), T("x", "w", "y")), equal("z", "w"))),
  all("xyzw", implies(and(T("z", "x", "y"), T("w", "x", "y")), equal("z", "w"))),
  all("xy", and(some("z", T("x", "z", "y")), some("z", T("z", "x", "y")))),
];
const idempotent = all("x", T("x", "x", "x"));
/** ((y·x)·y)·y = x. */
const shortIdentity = all("xyab", implies(and(T("y", "x", "a"), T("a", "y", "b")), T("b", "y", "x")));
/** ((x·y)·y)·y = x. */
const cubeIdentity = all("xyzw", implies(and(T("x", "y", "z"), T("z", "y", "w")), T("w", "y", "x")));
/** (x·y)·(y·x) = x. */
const selfOrthogonal = all("xyab", implies(and(T("x", "y", "a"), T("y", "x", "b")), T("a", "b", "x")));
const steiner = [
  ...operation,
  idempotent,
  all("xyz", implies(T("x", "y", "z"), and(T("y", "x", "z"), T("x", "z", "y")))),
];

// Semiorders and interval orders

const interval = all("abcd", implies(and(R("a", "b"), R("c", "d")), or(R("a", "d"), R("c", "b"))));
const semi = all("abcd", implies(and(R("a", "b"), R("b", "c")), or(R("a", "d"), R("d", "c"))));

const isEquivalence = (P: (x: string, y: string) => Formula) => [
  all("x", P("x", "x")),
  all("xy", implies(P("x", "y"), P("y", "x"))),
  all("xyz", implies(and(P("x", "y"), P("y", "z")), P("x", "z"))),
];
const grid = [
  ...isEquivalence(R),
  ...isEquivalence(S),
  all("xy", some("z", and(R("x", "z"), S("z", "y")))),
  all("xy", implies(and(R("x", "y"), S("x", "y")), equal("x", "y"))),
  some("xy", not(R("x", "y"))),
  some("xy", not(S("x", "y"))),
];
const oneToOne = all("xyz", implies(and(R("x", "z"), R("y", "z")), equal("x", "y")));
const functional = all("xyz", implies(and(R("x", "y"), R("x", "z")), equal("y", "z")));
const notOnto = some("y", all("x", not(R("x", "y"))));

const threeBeaten = all(
  "xyz",
  some("w", and(R("w", "x"), R("w", "y"), R("w", "z"), differ("w", "x"), differ("w", "y"), differ("w", "z"))),
);
const uniqueBetween = all(
  "xz",
  implies(
    R("x", "z"),
    some(
      "y",
      and(R("x", "y"), R("y", "z"), all("w", implies(and(R("x", "w"), R("w", "z")), equal("w", "y")))),
    ),
  ),
);
const squareOfS = all("xy", iff(R("x", "y"), some("z", and(S("x", "z"), S("z", "y")))));
const sharesSuccessor = all(
  "xy",
  iff(R("x", "y"), and(differ("x", "y"), some("z", and(S("x", "z"), S("y", "z"))))),
);
const group = [
  ...operation,
  some("e", all("x", and(T("e", "x", "x"), T("x", "e", "x"), some("y", T("y", "x", "e"))))),
  all("xyzabc", implies(and(T("x", "y", "a"), T("y", "z", "b"), T("a", "z", "c")), T("x", "b", "c"))),
];

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
