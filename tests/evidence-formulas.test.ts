/** Formulas made of formulas and clause forms: they say what they should, by trying all small structures. */
import fc from "fast-check";
import { describe, expect, it } from "vitest";
import type {
  AtomRecord,
  ClauseRecord,
  FormulaRecord,
  TermFormulaRecord,
  TermRecord,
} from "../lib/evidence/format.ts";
import { clauseForm, simplifyClause } from "../lib/logic/records/clause-form.ts";
import {
  atomOf,
  atomTerms,
  freeVariables,
  partsOf,
  recordFormula,
  sameUpToNames,
  termVariables,
} from "../lib/logic/records/formulas.ts";
import { miniscopeFormula, unfoldFormula } from "../lib/logic/records/made-formulas.ts";
import { type Interpretation, interpretationsOn, isTrue, isTrueClause } from "./support/evidence-judge.ts";
import { sentences } from "./support/random-formulas.ts";

const seed = Number(process.env.TWOPLACE_SEED ?? 20261201);
const relation = { name: "R", places: 2, infix: false };
const mark = { name: "P", places: 1, infix: false };
const records = (depth: number) => sentences([relation, mark], depth).map(recordFormula);
/** All interpretations of R and P on 1 and 2 points. */
const small = [1, 2].flatMap((size) => interpretationsOn(size, ["P/1", "R/2"])!);

function sameEverywhere(left: TermFormulaRecord, right: TermFormulaRecord): boolean {
  return small.every((over) => isTrue(left, over) === isTrue(right, over));
}

describe(`miniscoping (seed ${seed})`, () => {
  it("says the same, has ¬ at atoms only, and moves no further the second time", () => {
    fc.assert(
      fc.property(records(4), (formula) => {
        const moved = miniscopeFormula(formula);
        expect(sameEverywhere(formula, moved)).toBe(true);
        expect(freeVariables(moved)).toEqual([]);
        expect(isSettled(moved)).toBe(true);
        expect(miniscopeFormula(moved)).toEqual(moved);
      }),
      { seed, numRuns: 1000 },
    );
  });

  /** Negation normal form, and no quantifier before what it could move into. */
  function isSettled(part: TermFormulaRecord): boolean {
    const parts = partsOf(part);
    switch (part[0]) {
      case "implies":
      case "iff":
        return false;
      case "not":
        return part[1][0] === "is" || part[1][0] === "=";
      case "forall":
      case "exists": {
        const [kind, variable, body] = part;
        const isMoving =
          !freeVariables(body).includes(variable) ||
          body[0] === (kind === "forall" ? "and" : "or") ||
          ((body[0] === "and" || body[0] === "or") &&
            !partsOf(body).every((one) => freeVariables(one).includes(variable)));
        return !isMoving && isSettled(body);
      }
      default:
        return parts.every(isSettled);
    }
  }

  it.each<[string, TermFormulaRecord, TermFormulaRecord]>([
    ["what is bound by nothing", ["forall", "x", ["true"]], ["true"]],
    [
      "∃ over ∨",
      ["exists", "x", ["or", ["is", "P", "x"], ["is", "R", "x", "x"]]],
      ["or", ["exists", "x", ["is", "P", "x"]], ["exists", "x", ["is", "R", "x", "x"]]],
    ],
    [
      "quantifiers of a kind past each other",
      ["exists", "x", ["exists", "y", ["and", ["is", "R", "y", "x"], ["is", "P", "y"]]]],
      ["exists", "y", ["and", ["is", "P", "y"], ["exists", "x", ["is", "R", "y", "x"]]]],
    ],
  ])("%s", (_, formula, expected) => {
    expect(sameUpToNames(miniscopeFormula(formula), expected)).toBe(true);
  });
});

describe(`unfolding (seed ${seed})`, () => {
  /** The interpretation with P as a formula with x free defines it. */
  function withDefined(over: Interpretation, body: TermFormulaRecord): Interpretation {
    const holds = (name: string, points: readonly number[]) =>
      name === "P" ? isTrue(body, over, new Map([["x", points[0]!]])) : over.holds(name, points);
    return { ...over, holds };
  }

  it("says what the formula says where the definition is true", () => {
    const plain = small.filter((_, index) => index % 2 === 0);
    fc.assert(
      fc.property(records(3), sentences([relation], 3).map(recordFormula), (formula, sentence) => {
        // A body with x free: one quantifier of x is taken away.
        const body = openAt(sentence);
        if (body === null) return;
        const definition: TermFormulaRecord = ["forall", "x", ["iff", ["is", "P", "x"], body]];
        const unfolded = unfoldFormula(formula, definition)!;
        expect(JSON.stringify(unfolded)).not.toContain('"P"');
        for (const over of plain)
          expect(isTrue(unfolded, over)).toBe(isTrue(formula, withDefined(over, body)));
      }),
      { seed, numRuns: 1000 },
    );
  });

  it("leaves relations of the same name with other places alone", () => {
    const definition: TermFormulaRecord = ["forall", "x", ["iff", ["is", "d", "x"], ["is", "P", "x"]]];
    const both: TermFormulaRecord = [
      "exists",
      "y",
      ["and", ["is", "d", "y"], ["is", "d", "y", "y"], ["is", "d"]],
    ];
    expect(unfoldFormula(both, definition)).toEqual([
      "exists",
      "y",
      ["and", ["is", "P", "y"], ["is", "d", "y", "y"], ["is", "d"]],
    ]);
  });

  /** The body of the first quantifier of x that no other quantifier has around it. */
  function openAt(part: FormulaRecord): FormulaRecord | null {
    if (part[0] === "forall" || part[0] === "exists") return part[1] === "x" ? part[2] : null;
    return (
      partsOf(part)
        .map(openAt)
        .find((body) => body !== null) ?? null
    );
  }
});

describe(`sameness up to names (seed ${seed})`, () => {
  it("holds after renaming, and tells apart what some structure tells apart", () => {
    fc.assert(
      fc.property(records(3), records(3), (first, second) => {
        expect(sameUpToNames(first, withOtherNames(first))).toBe(true);
        if (!sameEverywhere(first, second)) expect(sameUpToNames(first, second)).toBe(false);
      }),
      { seed, numRuns: 1000 },
    );
  });

  it.each<[string, TermFormulaRecord, TermFormulaRecord]>([
    ["bound by another quantifier", nested("x", "y"), nested("y", "x")],
    ["relations", ["forall", "x", ["is", "P", "x"]], ["forall", "x", ["is", "Q", "x"]]],
    ["functions", ["forall", "x", ["is", "P", ["0.0", "x"]]], ["forall", "x", ["is", "P", ["0.1", "x"]]]],
    ["a function and a variable", ["forall", "0", ["is", "P", ["0"]]], ["forall", "0", ["is", "P", "0"]]],
  ])("different: %s", (_, left, right) => {
    expect(sameUpToNames(left, right)).toBe(false);
  });

  function nested(first: string, second: string): TermFormulaRecord {
    return ["forall", "x", ["exists", "y", ["is", "R", first, second]]];
  }

  function withOtherNames(part: TermFormulaRecord): TermFormulaRecord {
    const text = JSON.stringify(part);
    return JSON.parse(text.replaceAll('"x"', '"u"').replaceAll('"y"', '"x"').replaceAll('"z"', '"y"'));
  }
});

describe(`clause forms (seed ${seed})`, () => {
  /** Bits of all functions of some clauses together on two points; beyond so many they are not gone through. */
  const MOST_BITS = 10;

  it("can be made true by functions just where the formula is true", () => {
    let tried = 0;
    fc.assert(
      fc.property(records(3), (formula) => {
        const clauses = clauseForm(formula, 4);
        const functions = functionsOf(clauses);
        const bits = [...functions.values()].reduce((sum, places) => sum + 2 ** places, 0);
        if (bits > MOST_BITS) return;
        tried += 1;
        for (const name of functions.keys()) expect(name).toMatch(/^4\.\d+$/);
        for (const over of small) {
          const interpretations = over.size === 1 ? [over] : withFunctions(over, functions, bits);
          const isMadeTrue = interpretations.some((each) =>
            clauses.every((clause) => isAlwaysTrue(clause, each)),
          );
          expect(isMadeTrue).toBe(isTrue(formula, over));
        }
      }),
      { seed, numRuns: 600 },
    );
    expect(tried).toBeGreaterThan(300);
  });

  function functionsOf(clauses: readonly ClauseRecord[]): Map<string, number> {
    const found = new Map<string, number>();
    const look = (term: TermRecord): void => {
      if (typeof term === "string") return;
      found.set(term[0], term.length - 1);
      (term.slice(1) as TermRecord[]).forEach(look);
    };
    for (const clause of clauses) for (const literal of clause) atomTerms(atomOf(literal)).forEach(look);
    return found;
  }

  function withFunctions(
    over: Interpretation,
    functions: Map<string, number>,
    bits: number,
  ): Interpretation[] {
    const firsts = new Map<string, number>();
    let next = 0;
    for (const [name, places] of functions) {
      firsts.set(name, next);
      next += 2 ** places;
    }
    return Array.from({ length: 2 ** bits }, (_, code) => ({
      ...over,
      value: (name: string, points: readonly number[]) =>
        (code >> (firsts.get(name)! + points.reduce((row, point) => row * 2 + point, 0))) & 1,
    }));
  }

  function isAlwaysTrue(clause: ClauseRecord, over: Interpretation): boolean {
    const each = over.size === 1 ? { ...over, value: () => 0 } : over;
    const variables = [
      ...new Set(clause.flatMap((literal) => atomTerms(atomOf(literal)).flatMap(termVariables))),
    ];
    return Array.from({ length: over.size ** variables.length }, (_, code) =>
      isTrueClause(
        clause,
        each,
        new Map(variables.map((name, place) => [name, Math.floor(code / over.size ** place) % over.size])),
      ),
    ).every((value) => value);
  }

  it("have no repetitions and nothing that is true or false as it stands", () => {
    const atom: AtomRecord = ["is", "P", "x"];
    expect(simplifyClause([atom, atom])).toEqual([atom]);
    expect(simplifyClause([atom, ["not", atom]])).toBeNull();
    expect(simplifyClause([["=", "x", "x"]])).toBeNull();
    expect(simplifyClause([["not", ["=", "x", "x"]], atom])).toEqual([atom]);
    expect(
      simplifyClause([
        ["=", "x", "y"],
        ["not", ["=", "y", "x"]],
      ]),
    ).toHaveLength(2);
  });

  it("of long disjunctions are made, of what grows without bound are not", () => {
    const atoms = Array.from({ length: 3000 }, (_, index): TermFormulaRecord => ["is", `P${index}`, "x"]);
    expect(clauseForm(["forall", "x", ["or", ...atoms]], 0)).toHaveLength(1);
    const pairs = Array.from(
      { length: 20 },
      (_, index): TermFormulaRecord => ["and", atoms[2 * index]!, atoms[2 * index + 1]!],
    );
    expect(() => clauseForm(["forall", "x", ["or", ...pairs]], 0)).toThrow();
  });
});
