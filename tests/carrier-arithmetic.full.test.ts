/**
 * What is true in structures over numbers, confirmed by a general solver: z3-solver decides the problems of linear arithmetic
 * with quantifiers that are written for them. It reads what the user would send to any solver.
 */
import fc from "fast-check";
import { afterAll, beforeAll, describe, expect, it } from "vitest";
import { buildCarrier } from "../lib/carriers/build.ts";
import { buildStructure } from "../lib/carriers/defined.ts";
import { definitionOf } from "../lib/carriers/definition.ts";
import type { Structure } from "../lib/carriers/structure.ts";
import { vocabularyOf } from "../lib/carriers/vocabulary/of.ts";
import { checkFinite } from "../lib/inquiry/check-finite.ts";
import { unwatchedWork } from "../lib/inquiry/work.ts";
import { printArithmetic } from "../lib/language/carrier-smt-lib.ts";
import { parseCell } from "../lib/language/parser.ts";
import { emptyScope } from "../lib/language/statements.ts";
import { allOf, anyOf, notOf } from "../lib/logic/carrier-formulas.ts";
import { not } from "../lib/logic/formula.ts";
import { Meter } from "../lib/logic/meter.ts";
import type {
  CarrierDescription,
  PointsDescription,
  StructureDefinition,
} from "../lib/logic/structure-definition.ts";
import { satisfies } from "../lib/structures/evaluate.ts";
import { infiniteOnly, readTheory } from "./support/corpora.ts";
import { sentences as randomSentences } from "./support/random-formulas.ts";
import { type Oracle, startOracle } from "./support/z3.ts";

let oracle: Oracle;
beforeAll(async () => {
  oracle = await startOracle();
});
afterAll(() => oracle.close());

/** Milliseconds for one problem. */
const LIMIT = { timeout: 5_000 };

describe("structures found for infinite-only.json, each axiom by z3-solver", () => {
  it("are confirmed on all sets whose structure is over numbers", async () => {
    let confirmed = 0;
    let unknown = 0;
    const sets = new Set<string>();
    for (const { id, axioms } of infiniteOnly) {
      const theory = readTheory(axioms);
      const { model } = checkFinite(theory, unwatchedWork);
      const definition = model === null || "terms" in model ? null : definitionOf(model as Structure);
      if (definition === null) continue;
      for (const { label, formula } of theory.axioms) {
        const text = printArithmetic(definition, formula, label);
        if (text === null) continue;
        const { mistake, answer } = await oracle.read(text, LIMIT, true);
        expect(mistake, `${id} ${label}: ${text}`).toBeNull();
        expect(answer, `${id} ${label}: ${text}`).not.toBe(1);
        if (answer === -1) confirmed += 1;
        else unknown += 1;
        sets.add(id);
        const opposite = printArithmetic(definition, not(formula), label)!;
        expect((await oracle.read(opposite, LIMIT, true)).answer, opposite).not.toBe(-1);
      }
    }
    expect(sets.size).toBeGreaterThanOrEqual(30);
    expect(unknown).toBeLessThanOrEqual(confirmed / 50);
  }, 300_000);
});

describe("random definitions on what is made of lines and points", () => {
  const seed = Number(process.env.TWOPLACE_SEED ?? 20261202);
  const runs = 150;
  const R = { name: "R", places: 2, infix: false };
  type Description = Exclude<CarrierDescription, PointsDescription>;
  const lines: readonly Description[] = [
    { kind: "dense-line", colours: 1 },
    { kind: "integer-line", offset: 1 },
    { kind: "half-line", offset: 1, ends: 2 },
  ];
  const points: CarrierDescription = { kind: "points", size: 2 };
  const line = fc.constantFrom(...lines);
  const component = fc.oneof(line, fc.constant(points));
  const carriers: fc.Arbitrary<Description> = fc.oneof(
    line,
    fc
      .tuple(line, fc.constantFrom([1, 0], [1, 1], [1, 0, 0]))
      .map(([over, widths]) => ({ kind: "tuples" as const, over, widths })),
    fc.array(component, { minLength: 2, maxLength: 3 }).map((parts) => ({ kind: "sum" as const, parts })),
    fc.tuple(line, component).map(([outer, inner]) => ({ kind: "product" as const, outer, inner })),
    fc.tuple(line, line, line).map(
      ([first, second, inner]): Description => ({
        kind: "product",
        outer: { kind: "sum", parts: [first, second] },
        inner,
      }),
    ),
    fc.tuple(line, line).map(
      ([over, other]): Description => ({
        kind: "sum",
        parts: [{ kind: "tuples", over, widths: [1, 1] }, other, points],
      }),
    ),
  );
  const cases = carriers.chain((carrier) => {
    const atoms = vocabularyOf(buildCarrier(carrier)).atoms(["x", "y"]);
    const literal = fc
      .tuple(fc.constantFrom(...atoms), fc.boolean())
      .map(([atom, negated]) => (negated ? notOf(atom) : atom));
    const formula = fc
      .array(fc.array(literal, { minLength: 1, maxLength: 2 }).map(allOf), { minLength: 1, maxLength: 2 })
      .map(anyOf);
    return fc.record({ carrier: fc.constant(carrier), formula, sentence: randomSentences([R], 2) });
  });

  it(`are true where z3-solver says so (seed ${seed})`, async () => {
    let confirmed = 0;
    for (const { carrier, formula, sentence } of fc.sample(cases, { numRuns: runs, seed })) {
      const definition: StructureDefinition = {
        carrier,
        relations: [{ relation: R, variables: ["x", "y"], formula }],
      };
      const text = printArithmetic(definition, sentence, "it");
      if (text === null) continue;
      const expected = satisfies(buildStructure(definition), sentence, new Meter(Number.POSITIVE_INFINITY));
      const { mistake, answer } = await oracle.read(text, LIMIT, true);
      expect(mistake, text).toBeNull();
      expect(answer, `${JSON.stringify(definition)}\n${text}`).not.toBe(expected ? 1 : -1);
      if (answer !== 0) confirmed += 1;
    }
    expect(confirmed).toBeGreaterThan(runs * 0.8);
  }, 300_000);
});

describe("structures that cells define", () => {
  const cells: readonly (readonly [string, string, boolean])[] = [
    ["half-line where Rxy iff y = x + 1", "∃x ∀y ¬Ryx", true],
    ["integer-line where Rxy iff y = x + 1", "∃x ∀y ¬Ryx", false],
    ["half-line where Rxy iff x + 2 <= y", "∀x ∃y (x ≠ y ∧ ¬Rxy ∧ ¬Ryx)", true],
    [
      "2 copies of dense-line where Rxy iff copy(x) = 1 and copy(y) = 2 and x.1 < y.1",
      "∀x ∃y (Rxy ∨ Ryx)",
      true,
    ],
    ["2 copies of integer-line where Rxy iff copy(x) = 2 and x = y", "∀x ∀y (Rxy → x = y)", true],
    ["half-line where Rxy iff x = 0 or y < 2", "∃x ∀y Rxy", true],
  ];
  it.each(cells)("%s: %s is %s", async (structure, sentence, expected) => {
    const cell = parseCell(`write ${structure} ⊨ ${sentence} as SMT-LIB`, emptyScope);
    const statement = cell.statements[0]!;
    if (statement.kind !== "write" || statement.subject.kind !== "structure") throw new Error(structure);
    const { structure: named, sentences } = statement.subject;
    const text = printArithmetic(named.structure, sentences[0]!.formula, "it")!;
    const { mistake, answer } = await oracle.read(text, LIMIT, true);
    expect(mistake, text).toBeNull();
    expect(answer, text).toBe(expected ? -1 : 1);
  });
});
