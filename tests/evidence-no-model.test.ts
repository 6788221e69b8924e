/** "No model of size n": the propositional form by brute force, clause proofs of published facts, and wrong proofs. */
import fc from "fast-check";
import { describe, expect, it } from "vitest";
import { checkNoModel } from "../lib/evidence/no-model.ts";
import { Rejected } from "../lib/evidence/read.ts";
import { proveNoModel } from "../lib/inquiry/no-model.ts";
import { and, atom, equal, exists, type Formula, forall, implies, not, or } from "../lib/logic/formula.ts";
import { Meter } from "../lib/logic/meter.ts";
import { FormulaTooLarge, recordFormula } from "../lib/logic/records/formulas.ts";
import { groundForm } from "../lib/logic/records/ground-form.ts";
import { Propagation } from "../lib/logic/records/propagation.ts";
import { Solver } from "../lib/structures/sat/solver.ts";
import { allInterpretations, isTrue } from "./support/brute-force.ts";
import { sentences } from "./support/random-formulas.ts";
import { cnfs, firstBadLine, literals } from "./support/sat-check.ts";

const seed = Number(process.env.TWOPLACE_SEED ?? 20261201);
const unbounded = () => new Meter(Number.POSITIVE_INFINITY);
const relation = { name: "R", places: 2, infix: false };
const mark = { name: "P", places: 1, infix: false };
const R = (x: string, y: string) => atom(relation, x, y);

const irreflexive = forall("x", not(R("x", "x")));
const symmetric = forall(["x", "y"], implies(R("x", "y"), R("y", "x")));
const transitive = forall(["x", "y", "z"], implies(and(R("x", "y"), R("y", "z")), R("x", "z")));

function isAccepted(
  axioms: readonly Formula[],
  size: number,
  proof: readonly (readonly number[])[],
): boolean {
  const records = axioms.map(recordFormula);
  try {
    checkNoModel(
      { fact: "no-model", axioms: [...records.keys()], size, proof },
      records,
      "fact",
      unbounded(),
    );
    return true;
  } catch (problem) {
    if (problem instanceof Rejected) return false;
    throw problem;
  }
}

function isSatisfiable(axioms: readonly Formula[], size: number): boolean {
  const form = groundForm(axioms.map(recordFormula), size, unbounded());
  const solver = new Solver();
  while (solver.variableCount < form.variables) solver.newVariable();
  for (const clause of form.clauses) solver.addClause(clause);
  return solver.solve(unbounded()) === "satisfiable";
}

describe(`the propositional form can be satisfied just if there is a model (seed ${seed})`, () => {
  it.each([
    [1, 300],
    [2, 300],
    [3, 60],
  ])("random sentences with identity on %i points", (size, numRuns) => {
    const all = [...allInterpretations(size, [mark, relation])];
    fc.assert(
      fc.property(sentences([relation, mark], 3), sentences([relation, mark], 2), (first, second) => {
        const hasModel = all.some((over) => isTrue(first, size, over) && isTrue(second, size, over));
        expect(isSatisfiable([first, second], size)).toBe(hasModel);
      }),
      { seed, numRuns },
    );
  });

  it("each relation on up to 3 points alone: its description has a model, the order notwithstanding", () => {
    for (const size of [1, 2, 3])
      for (const over of allInterpretations(size, [relation])) {
        const names = ["x", "y", "z"].slice(0, size);
        const pairs = names.flatMap((x, i) =>
          names.map((y, j) => (over.get("R")!.has(`${i},${j}`) ? R(x, y) : not(R(x, y)))),
        );
        const apart = names.flatMap((x, i) => names.slice(i + 1).map((y) => not(equal(x, y))));
        expect(isSatisfiable([exists(names, and(...pairs, ...apart))], size)).toBe(true);
      }
  });

  it("relations of one name and different places are different", () => {
    const unary = (x: string) => atom({ name: "R", places: 1, infix: false }, x);
    expect(isSatisfiable([forall("x", unary("x")), forall("x", not(R("x", "x")))], 2)).toBe(true);
    expect(isSatisfiable([forall("x", unary("x")), exists("x", not(unary("x")))], 2)).toBe(false);
  });
});

/** Each point has just so many neighbours. */
function regular(degree: number): Formula {
  const others = Array.from({ length: degree }, (_, index) => `y${index}`);
  const apart = others.flatMap((y, index) => others.slice(0, index).map((z) => not(equal(y, z))));
  const each = others.map((y) => R("x", y));
  const onlyThese = forall("z", implies(R("x", "z"), or(...others.map((y) => equal("z", y)))));
  return forall("x", exists(others, and(...each, ...apart, onlyThese)));
}

const dense = forall(["x", "y"], implies(R("x", "y"), exists("z", and(R("x", "z"), R("z", "y")))));
const tournament = [
  irreflexive,
  forall(["x", "y"], implies(R("x", "y"), not(R("y", "x")))),
  forall(["x", "y"], or(equal("x", "y"), R("x", "y"), R("y", "x"))),
];
const friends = forall(
  ["x", "y"],
  or(
    equal("x", "y"),
    exists(
      "z",
      and(R("x", "z"), R("y", "z"), forall("u", implies(and(R("x", "u"), R("y", "u")), equal("u", "z")))),
    ),
  ),
);
const facts: readonly (readonly [
  name: string,
  axioms: readonly Formula[],
  without: readonly number[],
  not: number | null,
])[] = [
  // A finite order has covering pairs (textbooks).
  [
    "a dense strict order with comparable points",
    [irreflexive, transitive, dense, exists(["x", "y"], R("x", "y"))],
    [1, 2, 3, 4, 5, 6],
    null,
  ],
  // The degrees of a graph have an even sum (Euler 1736); the complete graph on 4 points is cubic.
  ["a cubic graph", [irreflexive, symmetric, regular(3)], [1, 2, 3, 5], 4],
  // Each friendship graph consists of triangles with one point in common (Erdős, Rényi & Sós 1966).
  ["a friendship graph", [irreflexive, symmetric, friends], [2, 4, 6], 5],
  // Any two are beaten by a third: 7 players are needed (E. & G. Szekeres 1965, on a question of Schütte).
  [
    "a tournament where any two are beaten by a third",
    [...tournament, forall(["x", "y"], exists("z", and(R("z", "x"), R("z", "y"))))],
    [1, 2, 3, 4, 5, 6],
    7,
  ],
  // One to one and not onto (Dedekind 1888).
  [
    "an injection that is not onto",
    [
      forall("x", exists("y", and(R("x", "y"), forall("z", implies(R("x", "z"), equal("y", "z")))))),
      forall(["x", "y", "z"], implies(and(R("x", "z"), R("y", "z")), equal("x", "y"))),
      exists("x", forall("y", not(R("y", "x")))),
    ],
    [1, 2, 3, 4, 5],
    null,
  ],
];

describe("clause proofs of published facts", () => {
  it.each(facts)("there is not: %s", (_, axioms, sizes, other) => {
    for (const size of sizes) {
      const proof = proveNoModel(axioms, size, new Meter());
      expect(proof, `${size} points`).not.toBeNull();
      expect(isAccepted(axioms, size, proof!), `${size} points`).toBe(true);
      const form = groundForm(axioms.map(recordFormula), size, unbounded());
      if (form.clauses.length < 400)
        expect(
          firstBadLine(
            form.clauses,
            proof!.map((clause) => ({ kind: "derived", clause })),
          ),
        ).toBe(-1);
      // With a model there is no proof, and no proof of something else is taken for one.
      if (other !== null) expect(isAccepted(axioms, other, proof!)).toBe(false);
      expect(isAccepted(axioms.slice(1), 1, proof!) && isSatisfiable(axioms.slice(1), 1)).toBe(false);
    }
    if (other !== null) expect(proveNoModel(axioms, other, new Meter())).toBeNull();
  });

  it("end with the meter, and the same steps give the same proof", () => {
    const [, axioms] = facts[3]!;
    const meter = new Meter(2);
    expect(proveNoModel(axioms, 6, meter)).toBeNull();
    expect(meter.steps).toBe(2);
    const [first, second] = [new Meter(), new Meter()];
    expect(proveNoModel(axioms, 5, first)).toEqual(proveNoModel(axioms, 5, second));
    expect(first.steps).toBe(second.steps);
  });
});

describe(`wrong proofs (seed ${seed})`, () => {
  it("clauses at random never show that there is no model where there is one", () => {
    const size = 2;
    const all = [...allInterpretations(size, [relation])];
    fc.assert(
      fc.property(
        sentences([relation], 2),
        fc.array(fc.array(literals(12), { maxLength: 3 })),
        (sentence, proof) => {
          fc.pre(all.some((over) => isTrue(sentence, size, over)));
          expect(isAccepted([sentence], size, proof)).toBe(false);
        },
      ),
      { seed, numRuns: 500 },
    );
  });

  it.each<[string, readonly (readonly number[])[]]>([
    ["a literal of no variable", [[1000], []]],
    ["a literal 0", [[0], []]],
    ["a clause that does not follow", [[1], []]],
  ])("%s", (_, proof) => {
    expect(isAccepted([irreflexive, exists("x", R("x", "x"))], 2, [])).toBe(true);
    expect(isAccepted([symmetric], 2, proof)).toBe(false);
  });

  it("huge domains and relations are refused at once", () => {
    const wide = atom({ name: "W", places: 40, infix: false }, ...Array<string>(40).fill("x"));
    expect(() => isAccepted([forall("x", wide)], 1000, [])).toThrow(FormulaTooLarge);
    expect(() => isAccepted([], 1_000_000, [])).toThrow(FormulaTooLarge);
  });
});

describe(`unit propagation by definition (seed ${seed})`, () => {
  it("tells what follows, clause after clause", () => {
    fc.assert(
      fc.property(
        cnfs(8),
        fc.array(fc.array(literals(8), { maxLength: 4 }), { maxLength: 12 }),
        (cnf, asked) => {
          const propagation = new Propagation(unbounded());
          const added: (readonly number[])[] = [];
          for (const clause of cnf.clauses) {
            propagation.add(clause);
            added.push(clause);
            const next = asked[added.length % Math.max(1, asked.length)];
            if (next === undefined) continue;
            const follows = firstBadLine(added, [{ kind: "derived", clause: next }]) === -1;
            expect(propagation.follows(next)).toBe(follows);
          }
        },
      ),
      { seed, numRuns: 2000 },
    );
  });
});
