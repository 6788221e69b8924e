/** Normal forms: each keeps what it promises, step by step, on all small structures; has its shape; and stays bounded. */
import fc from "fast-check";
import { describe, expect, it } from "vitest";
import { Points } from "../lib/carriers/points.ts";
import type { Clause } from "../lib/logic/clausal.ts";
import {
  and,
  atom,
  equal,
  exists,
  type Formula,
  forall,
  freeVariables,
  iff,
  implies,
  not,
  or,
  partsOf,
  type RelationSymbol,
  sameFormula,
} from "../lib/logic/formula.ts";
import { Meter } from "../lib/logic/meter.ts";
import { clausesOf, normalise } from "../lib/logic/normal-forms/normalise.ts";
import { DEFAULT_LIMITS, type NormalForm, type NormalFormName } from "../lib/logic/normal-forms/result.ts";
import { findStructure } from "../lib/structures/search.ts";
import { allInterpretations, isTrue } from "./support/brute-force.ts";
import { Expansions, functionsIn } from "./support/expansions.ts";
import { expectHandled, expectKept, reach, sizeOf, truths } from "./support/kept.ts";
import { sentences } from "./support/random-formulas.ts";

const seed = Number(process.env.TWOPLACE_SEED ?? 20261201);
const options = (numRuns: number) => ({ seed, numRuns, verbose: 1 as const });

const R: RelationSymbol = { name: "R", places: 2, infix: false };
const P: RelationSymbol = { name: "P", places: 1, infix: false };
const Rxy = atom(R, "x", "y");
const Ryx = atom(R, "y", "x");

const FORMS: readonly NormalFormName[] = [
  "negation",
  "prenex",
  "miniscoped",
  "skolem",
  "clause",
  "definitional-clause",
  "disjunctive",
];
const EQUIVALENT: readonly NormalFormName[] = ["negation", "prenex", "miniscoped", "disjunctive"];

function done(formula: Formula, form: NormalFormName): NormalForm {
  const result = normalise(formula, form);
  if (result.outcome === "refused") throw new Error(result.message);
  return result;
}

function formulaOf(formula: Formula, form: NormalFormName): Formula {
  const { value } = done(formula, form);
  if (value.kind !== "formula") throw new Error(`${form} gave ${value.kind}`);
  return value.formula;
}

function clausesIn(formula: Formula, form: "clause" | "definitional-clause"): readonly Clause[] {
  const { value } = done(formula, form);
  if (value.kind !== "clauses") throw new Error(`${form} gave ${value.kind}`);
  return value.clauses.clauses;
}

describe("what a form keeps", () => {
  it("is kept at every step, on all structures with one relation on 1 to 3 points", () => {
    fc.assert(
      fc.property(sentences([R], 2), (formula) => {
        expectKept(formula, FORMS, 1, [R], 8);
        expectKept(formula, FORMS, 2, [R], 6);
        expectKept(formula, FORMS, 3, [R], 2);
      }),
      options(15),
    );
  });

  it("is kept at every step, on all structures with two relations and on deeper sentences", () => {
    fc.assert(
      fc.property(sentences([R, P], 3), (formula) => {
        expectKept(formula, FORMS, 1, [R, P], 8);
        expectKept(formula, FORMS, 2, [R, P], 5);
      }),
      options(40),
    );
  });

  it("is kept for each value of the free variables", () => {
    fc.assert(
      fc.property(sentences([R], 2), (sentence) => {
        // What stands behind the outermost quantifiers, which the generator adds for the free variables.
        let formula: Formula = sentence;
        while (formula.kind === "forall" || formula.kind === "exists") formula = formula.body;
        const structures = [...allInterpretations(2, [R])];
        for (const form of FORMS)
          for (let code = 0; code < 8; code += 1) {
            const values = { x: code & 1, y: (code >> 1) & 1, z: code >> 2 };
            const original = structures.map((structure) => isTrue(formula, 2, structure, values));
            const { value } = done(formula, form);
            if (reach(value) <= 6) expect(truths(value, 2, [R], structures, values), form).toEqual(original);
          }
      }),
      options(40),
    );
  });

  it("is said: equivalence where nothing is added, and always for the forms that promise it", () => {
    fc.assert(
      fc.property(sentences([R, P], 3), (formula) => {
        for (const form of FORMS) {
          const { keeps, value } = done(formula, form);
          const added =
            value.kind === "formula"
              ? 0
              : value.kind === "skolem"
                ? value.functions.length
                : value.clauses.functions.length + value.clauses.definitions.length;
          expect(keeps, form).toBe(added === 0 ? "equivalent" : "equisatisfiable");
          if (EQUIVALENT.includes(form)) expect(keeps).toBe("equivalent");
        }
      }),
      options(200),
    );
  });

  it("is kept by the clauses of several sentences together", () => {
    fc.assert(
      fc.property(sentences([R], 2), sentences([R], 2), sentences([R], 2), (...theory) => {
        const structures = [...allInterpretations(2, [R])];
        const original = structures.map((structure) => theory.every((one) => isTrue(one, 2, structure)));
        for (const form of ["clause", "definitional-clause"] as const) {
          const result = clausesOf(theory, form);
          if (result.outcome === "refused") throw new Error(result.message);
          if (reach(result.value) <= 6)
            expect(truths(result.value, 2, [R], structures), form).toEqual(original);
          // The clauses of one source are those of that sentence.
          const first = result.value.clauses.clauses.filter(({ source }) => source === 0);
          expect(first.length).toBe(clausesIn(theory[0]!, form).length);
        }
      }),
      options(60),
    );
  });
});

/** Whether a formula is made of atoms, their negations and constants by ∧, ∨ and quantifiers. */
function isNegationForm(formula: Formula): boolean {
  if (formula.kind === "implies" || formula.kind === "iff") return false;
  if (formula.kind === "not") return formula.body.kind === "atom" || formula.body.kind === "equal";
  return partsOf(formula).every(isNegationForm);
}

function splitPrefix(formula: Formula): { kinds: string[]; variables: string[]; matrix: Formula } {
  if (formula.kind !== "forall" && formula.kind !== "exists")
    return { kinds: [], variables: [], matrix: formula };
  const { kinds, variables, matrix } = splitPrefix(formula.body);
  return { kinds: [formula.kind, ...kinds], variables: [formula.variable, ...variables], matrix };
}

function hasQuantifier(formula: Formula): boolean {
  return formula.kind === "forall" || formula.kind === "exists" || partsOf(formula).some(hasQuantifier);
}

/** Whether some quantifier could stand before less: it binds nothing, distributes, or passes a part. */
function isMovable(formula: Formula): boolean {
  if (partsOf(formula).some(isMovable)) return true;
  if (formula.kind !== "forall" && formula.kind !== "exists") return false;
  const block = [formula.variable];
  let body = formula.body;
  while (body.kind === formula.kind) {
    block.push(body.variable);
    body = body.body;
  }
  if (!freeVariables(body).includes(formula.variable)) return true;
  if (body.kind === (formula.kind === "forall" ? "and" : "or")) return true;
  if (body.kind !== "and" && body.kind !== "or") return false;
  const { parts } = body;
  return block.some((variable) => !parts.every((part) => freeVariables(part).includes(variable)));
}

function isLiteral(formula: Formula): boolean {
  const inner = formula.kind === "not" ? formula.body : formula;
  return inner.kind === "atom" || inner.kind === "equal";
}

describe("the shape of a form", () => {
  const everySentence = (check: (formula: Formula) => void) =>
    fc.assert(fc.property(sentences([R, P], 3), check), options(300));

  it("negation: only before atoms, and no conditionals", () => {
    everySentence((formula) => {
      expect(isNegationForm(formulaOf(formula, "negation"))).toBe(true);
    });
  });

  it("prenex: distinct variables in front, none of them idle, then no quantifiers", () => {
    everySentence((formula) => {
      const { variables, matrix } = splitPrefix(formulaOf(formula, "prenex"));
      expect(new Set(variables).size).toBe(variables.length);
      expect(hasQuantifier(matrix)).toBe(false);
      for (const variable of variables) expect(freeVariables(matrix)).toContain(variable);
      expect(isNegationForm(matrix)).toBe(true);
    });
  });

  it("miniscoped: no quantifier can be moved inwards", () => {
    everySentence((formula) => {
      const miniscoped = formulaOf(formula, "miniscoped");
      expect(isNegationForm(miniscoped)).toBe(true);
      expect(isMovable(miniscoped)).toBe(false);
    });
  });

  it("Skolem: universal quantifiers in front; functions with the arguments that they say", () => {
    everySentence((formula) => {
      const { value } = done(formula, "skolem");
      if (value.kind !== "skolem") throw new Error(value.kind);
      const { kinds, variables, matrix } = splitPrefix(value.formula as Formula);
      expect(new Set(variables).size).toBe(variables.length);
      expect(kinds).not.toContain("exists");
      expect(hasQuantifier(matrix)).toBe(false);
      const names = value.functions.map(({ name }) => name);
      expect(new Set(names).size).toBe(names.length);
      for (const { name, places } of functionsIn(value.formula)) {
        const symbol = value.functions.find((one) => one.name === name)!;
        expect(places).toBe(symbol.places);
        expect(variables).not.toContain(name);
        expect(["R", "P"]).not.toContain(name);
        if (symbol.origin.kind !== "skolem") throw new Error("parameter in a Skolem form");
        expect(symbol.origin.parameters.length).toBe(places);
        expect(symbol.origin.formula.kind).toBe("exists");
      }
    });
  });

  it("disjunctive: a prefix, then disjunctions of conjunctions of literals without contradiction", () => {
    everySentence((formula) => {
      const { matrix } = splitPrefix(formulaOf(formula, "disjunctive"));
      if (matrix.kind === "true" || matrix.kind === "false") return;
      for (const conjunction of matrix.kind === "or" ? matrix.parts : [matrix]) {
        const literals = conjunction.kind === "and" ? conjunction.parts : [conjunction];
        expect(literals.every(isLiteral)).toBe(true);
        for (const literal of literals)
          expect(literals.some((other) => sameFormula(other, not(literal)))).toBe(false);
      }
    });
  });

  it("clauses: no literal twice or with its negation, no t ≠ t, no t = t", () => {
    everySentence((formula) => {
      for (const form of ["clause", "definitional-clause"] as const)
        for (const { literals } of clausesIn(formula, form)) {
          const texts = literals.map(({ positive, atom: inner }) => `${positive}${JSON.stringify(inner)}`);
          expect(new Set(texts).size).toBe(texts.length);
          for (const { positive, atom: inner } of literals) {
            expect(texts).not.toContain(`${!positive}${JSON.stringify(inner)}`);
            if (inner.kind === "equal")
              expect(JSON.stringify(inner.left)).not.toBe(JSON.stringify(inner.right));
          }
        }
    });
  });

  it("prenex: a form that is one already is left alone, also without quantifiers", () => {
    const given = [
      forall(["x"], exists(["y"], and(Rxy, not(Ryx)))),
      or(Rxy, equal("x", "y")),
      exists(["x", "y"], forall(["z"], or(Rxy, atom(R, "y", "z")))),
    ];
    for (const formula of given) {
      expect(formulaOf(formula, "prenex")).toEqual(formula);
      expect(done(formula, "prenex").steps).toEqual([]);
    }
  });
});

describe("examples", () => {
  const Pof = (variable: string) => atom(P, variable);

  it("prenex: one alternation where quantifiers do not depend on one another", () => {
    // ∀x∃y∀z (Px ∧ Py ∧ Pz) says ∃y Py and ∀x Px: the alternations are only apparent.
    const apparent = forall("x", exists("y", forall("z", and(Pof("x"), Pof("y"), Pof("z")))));
    const { kinds } = splitPrefix(formulaOf(apparent, "prenex"));
    expect(kinds.filter((kind, index) => index > 0 && kind !== kinds[index - 1]).length).toBe(1);
    // (∀x∃y Rxy) ∧ (∃x∀y Ryx): ∃∀∃ has two alternations, ∀∃∀ and the interleaving ∀∃∃∀ of the written order too,
    // but ∀x∃y after ∃x∀y written one after the other three.
    const both = and(forall("x", exists("y", Rxy)), exists("x", forall("y", Ryx)));
    expect(splitPrefix(formulaOf(both, "prenex")).kinds).toEqual(["exists", "forall", "exists"]);
  });

  it("prenex: conjuncts share universal variables", () => {
    const formula = and(forall(["x", "y"], or(Rxy, Ryx)), forall(["x"], atom(R, "x", "x")));
    expect(splitPrefix(formulaOf(formula, "prenex")).kinds).toEqual(["forall", "forall"]);
  });

  it("miniscoped: a chain of three variables falls apart into two", () => {
    // ∃x∃y∃z (Rxy ∧ Ryz) is ∃y (∃x Rxy ∧ ∃z Ryz).
    const chain = exists(["x", "y", "z"], and(Rxy, atom(R, "y", "z")));
    const expected = exists("y", and(exists("x", Rxy), exists("z", atom(R, "y", "z"))));
    expect(formulaOf(chain, "miniscoped")).toEqual(expected);
  });

  it("Skolem: functions have the arguments that they depend on, no more", () => {
    // In ∀x∀y∃z (Rxy → Pz), z depends on nothing once the scope is small (the value of miniscoping; Nonnengart &
    // Weidenbach 2001, section 5).
    const formula = forall(["x", "y"], exists("z", implies(Rxy, Pof("z"))));
    const { value } = done(formula, "skolem");
    expect(value.kind === "skolem" && value.functions.map(({ places }) => places)).toEqual([0]);
  });

  it("says in what order things were done", () => {
    const formula = forall(["x", "y"], implies(Rxy, exists("z", and(atom(R, "x", "z"), atom(R, "z", "y")))));
    expect(done(formula, "clause").steps.map(({ done: what, times }) => `${what} ×${times}`)).toEqual([
      "implication removed ×1",
      "existential quantifier replaced by a function ×1",
      "disjunctions distributed ×1",
      "clauses read off ×1",
    ]);
  });

  it("added names pass over those in use", () => {
    const c: RelationSymbol = { name: "D1", places: 1, infix: false };
    const used = exists(
      "c",
      forall("f", exists("y", and(atom(c, "y"), atom(R, "c", "f"), atom(R, "f", "y")))),
    );
    const { value } = done(used, "skolem");
    const names = value.kind === "skolem" ? value.functions.map(({ name }) => name) : [];
    expect(names.length).toBeGreaterThan(1);
    for (const name of names) expect(["c", "f", "y", "D1", "R"]).not.toContain(name);
  });
});

describe("size", () => {
  /** Alternating conjunctions of pairs: n parts, 2^n clauses. */
  const pairs = (count: number) =>
    or(...Array.from({ length: count }, (_, i) => and(atom(R, `x${i}`, "y"), atom(R, "y", `x${i}`))));
  const nestedIff = (count: number): Formula => {
    let formula: Formula = Rxy;
    for (let i = 0; i < count; i += 1) formula = iff(atom(R, `x${i}`, "y"), formula);
    return formula;
  };

  it("plain clauses are refused where they would be too many, and the definitional form stays small", () => {
    const formula = pairs(40);
    const plain = normalise(formula, "clause");
    expect(plain).toMatchObject({
      outcome: "refused",
      code: "form-too-large",
      limit: DEFAULT_LIMITS.parts,
      suggestion: "definitional-clause",
    });
    // One clause of all names, and two for each name; the last part needs no name.
    expect(clausesIn(formula, "definitional-clause").length).toBeLessThanOrEqual(2 * 40 + 2);
  });

  it("a chain of equivalences doubles at each link, and is refused except in the definitional form", () => {
    const formula = nestedIff(200);
    for (const form of FORMS.filter((one) => one !== "definitional-clause"))
      expect(normalise(formula, form).outcome, form).toBe("refused");
    // Each link: a definition in both directions, at most 4 clauses for each of its two equivalences.
    expect(clausesIn(formula, "definitional-clause").length).toBeLessThanOrEqual(8 * 200);
  });

  it("a short chain of equivalences has as many clauses as half the rows of its truth table", () => {
    for (let count = 1; count <= 5; count += 1)
      expect(clausesIn(nestedIff(count), "clause").length).toBe(2 ** count);
  });

  it("the disjunctive form is refused where it would be too large", () => {
    const dual = and(
      ...Array.from({ length: 40 }, (_, i) => or(atom(R, `x${i}`, "y"), atom(R, "y", `x${i}`))),
    );
    expect(normalise(dual, "disjunctive").outcome).toBe("refused");
  });

  it("more quantifiers one inside another than other parts can read are refused", () => {
    const many = and(
      ...Array.from({ length: 3000 }, (_, i) => exists(`x${i}`, atom(R, `x${i}`, `y${i % 7}`))),
    );
    expect(normalise(many, "prenex")).toMatchObject({ outcome: "refused", code: "form-too-deep" });
    expect(done(many, "miniscoped").keeps).toBe("equivalent");
    expect(clausesIn(many, "clause").length).toBe(3000);
  });

  it("deep formulas come through or are refused, in every form", () => {
    expectHandled(100, FORMS);
  });

  it("wide formulas come through", () => {
    const wide = forall(
      ["x", "y"],
      and(
        ...Array.from({ length: 5000 }, (_, i) => or(atom(R, "x", `z${i % 50}`), atom(R, "y", `z${i % 60}`))),
      ),
    );
    for (const form of FORMS) expect(normalise(wide, form).outcome).toMatch(/done|refused/);
  });

  it("is never more than the limit that was set", () => {
    fc.assert(
      fc.property(sentences([R, P], 3), fc.integer({ min: 5, max: 60 }), (formula, parts) => {
        for (const form of FORMS) {
          const result = normalise(formula, form, { parts, levels: 30 });
          if (result.outcome === "refused") continue;
          const { value } = result;
          const size =
            value.kind === "clauses"
              ? value.clauses.clauses.reduce((sum, clause) => sum + clause.literals.length, 0)
              : sizeOf(value.formula as Formula);
          expect(size).toBeLessThanOrEqual(parts);
        }
      }),
      options(300),
    );
  });
});

describe("the search for structures", () => {
  it("agrees on satisfiability with the clauses", () => {
    fc.assert(
      fc.property(sentences([R], 3), (formula) => {
        for (const size of [1, 2, 3]) {
          const task = { carrier: new Points(size), sentences: [formula], relations: [R] };
          const found = findStructure(task, new Meter()).result === "found";
          for (const form of ["clause", "definitional-clause"] as const) {
            const { value } = done(formula, form);
            if (reach(value) > 5) continue;
            // Without a relation to interpret, all tables are to be found.
            expect(new Expansions(value, size, []).exist(new Map()), `${form} on ${size}`).toBe(found);
          }
        }
      }),
      options(100),
    );
  });
});
