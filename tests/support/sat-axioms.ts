/** The axioms that the encodings of `sat-encodings.ts` are made of. */
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

export const binary = (name: string): RelationSymbol => ({ name, places: 2, infix: false });
export const relationR = binary("R");
export const relationS = binary("S");
export const ternary: RelationSymbol = { name: "T", places: 3, infix: false };

export const R = (x: string, y: string) => atom(relationR, x, y);
export const S = (x: string, y: string) => atom(relationS, x, y);
export const T = (x: string, y: string, z: string) => atom(ternary, x, y, z);
export const all = (variables: string, body: Formula) => forall([...variables], body);
export const some = (variables: string, body: Formula) => exists([...variables], body);
export const differ = (...variables: string[]) =>
  and(...variables.flatMap((x, i) => variables.slice(i + 1).map((y) => not(equal(x, y)))));

// Properties of R

export const irreflexive = all("x", not(R("x", "x")));
export const reflexive = all("x", R("x", "x"));
export const symmetric = all("xy", implies(R("x", "y"), R("y", "x")));
export const asymmetric = all("xy", implies(R("x", "y"), not(R("y", "x"))));
export const antisymmetric = all("xy", implies(and(R("x", "y"), R("y", "x")), equal("x", "y")));
export const transitive = all("xyz", implies(and(R("x", "y"), R("y", "z")), R("x", "z")));
export const total = all("xy", or(R("x", "y"), R("y", "x"), equal("x", "y")));
export const serial = all("x", some("y", R("x", "y")));
export const dense = all("xz", implies(R("x", "z"), some("y", and(R("x", "y"), R("y", "z")))));
export const triangleFree = all("xyz", not(and(R("x", "y"), R("y", "z"), R("x", "z"))));
export const partialOrder = [reflexive, antisymmetric, transitive];
export const strictOrder = [irreflexive, transitive];
export const graph = [irreflexive, symmetric];
export const tournament = [asymmetric, total];

export const least = (z: string, bound: (w: string) => Formula, down: (a: string, b: string) => Formula) =>
  and(bound(z), all("w", implies(bound("w"), down(z, "w"))));
export const joins = all(
  "xy",
  some(
    "z",
    least("z", (w) => and(R("x", w), R("y", w)), R),
  ),
);
export const meets = all(
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
export const lattice = [...partialOrder, joins, meets];
/** Five points as in the pentagon: o below all, i above all, a below b, c beside both. */
export const pentagon = some(
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
export const complemented = all(
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
export const noAtomsFromBelow = all(
  "x",
  implies(
    some("y", and(R("y", "x"), differ("x", "y"))),
    some("yz", and(R("y", "x"), R("z", "x"), differ("x", "y", "z"), not(R("y", "z")), not(R("z", "y")))),
  ),
);

export const commonNeighbour = (x: string, y: string, z: string) => and(R(x, z), R(y, z));
export const oneCommonNeighbour = (x: string, y: string) =>
  some("z", and(commonNeighbour(x, y, "z"), all("w", implies(commonNeighbour(x, y, "w"), equal("w", "z")))));
export const twoCommonNeighbours = (x: string, y: string) =>
  some(
    "zv",
    and(differ("z", "v"), all("w", iff(commonNeighbour(x, y, "w"), or(equal("w", "z"), equal("w", "v"))))),
  );
export const degree = (count: number) => {
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
export const clique = (variables: string, sign: (f: Formula) => Formula) =>
  all(
    variables,
    implies(
      differ(...variables),
      not(and(...[...variables].flatMap((x, i) => [...variables.slice(i + 1)].map((y) => sign(R(x, y)))))),
    ),
  );
export const bothBeaten = all(
  "xy",
  some("z", and(R("z", "x"), R("z", "y"), differ("z", "x"), differ("z", "y"))),
);
/** For any two points, every way to be joined to them occurs. */
export const extension = all(
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

export const operation = [
  all("xy", some("z", T("x", "y", "z"))),
  all("xyzw", implies(and(T("x", "y", "z"), T("x", "y", "w")), equal("z", "w"))),
];
export const quasigroup = [
  ...operation,
  all("xyzw", implies(and(T("x", "z", "y"), T("x", "w", "y")), equal("z", "w"))),
  all("xyzw", implies(and(T("z", "x", "y"), T("w", "x", "y")), equal("z", "w"))),
  all("xy", and(some("z", T("x", "z", "y")), some("z", T("z", "x", "y")))),
];
export const idempotent = all("x", T("x", "x", "x"));
/** ((y·x)·y)·y = x. */
export const shortIdentity = all("xyab", implies(and(T("y", "x", "a"), T("a", "y", "b")), T("b", "y", "x")));
/** ((x·y)·y)·y = x. */
export const cubeIdentity = all("xyzw", implies(and(T("x", "y", "z"), T("z", "y", "w")), T("w", "y", "x")));
/** (x·y)·(y·x) = x. */
export const selfOrthogonal = all("xyab", implies(and(T("x", "y", "a"), T("y", "x", "b")), T("a", "b", "x")));
export const steiner = [
  ...operation,
  idempotent,
  all("xyz", implies(T("x", "y", "z"), and(T("y", "x", "z"), T("x", "z", "y")))),
];

// Semiorders and interval orders

export const interval = all("abcd", implies(and(R("a", "b"), R("c", "d")), or(R("a", "d"), R("c", "b"))));
export const semi = all("abcd", implies(and(R("a", "b"), R("b", "c")), or(R("a", "d"), R("d", "c"))));

export const isEquivalence = (P: (x: string, y: string) => Formula) => [
  all("x", P("x", "x")),
  all("xy", implies(P("x", "y"), P("y", "x"))),
  all("xyz", implies(and(P("x", "y"), P("y", "z")), P("x", "z"))),
];
export const grid = [
  ...isEquivalence(R),
  ...isEquivalence(S),
  all("xy", some("z", and(R("x", "z"), S("z", "y")))),
  all("xy", implies(and(R("x", "y"), S("x", "y")), equal("x", "y"))),
  some("xy", not(R("x", "y"))),
  some("xy", not(S("x", "y"))),
];
export const oneToOne = all("xyz", implies(and(R("x", "z"), R("y", "z")), equal("x", "y")));
export const functional = all("xyz", implies(and(R("x", "y"), R("x", "z")), equal("y", "z")));
export const notOnto = some("y", all("x", not(R("x", "y"))));

export const threeBeaten = all(
  "xyz",
  some("w", and(R("w", "x"), R("w", "y"), R("w", "z"), differ("w", "x"), differ("w", "y"), differ("w", "z"))),
);
export const uniqueBetween = all(
  "xz",
  implies(
    R("x", "z"),
    some(
      "y",
      and(R("x", "y"), R("y", "z"), all("w", implies(and(R("x", "w"), R("w", "z")), equal("w", "y")))),
    ),
  ),
);
export const squareOfS = all("xy", iff(R("x", "y"), some("z", and(S("x", "z"), S("z", "y")))));
export const sharesSuccessor = all(
  "xy",
  iff(R("x", "y"), and(differ("x", "y"), some("z", and(S("x", "z"), S("y", "z"))))),
);
export const group = [
  ...operation,
  some("e", all("x", and(T("e", "x", "x"), T("x", "e", "x"), some("y", T("y", "x", "e"))))),
  all("xyzabc", implies(and(T("x", "y", "a"), T("y", "z", "b"), T("a", "z", "c")), T("x", "b", "c"))),
];
