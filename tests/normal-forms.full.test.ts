/**
 * Normal forms and fragments at length: on all structures with 3 points, and against the general SMT library
 * z3-solver, which knows nothing of finite domains.
 */
import fc from "fast-check";
import { afterAll, beforeAll, describe, expect, it } from "vitest";
import { Points } from "../lib/carriers/points.ts";
import type { Literal, Term, TermFormula } from "../lib/logic/clausal.ts";
import type { Formula, RelationSymbol } from "../lib/logic/formula.ts";
import { finiteCheckBound } from "../lib/logic/fragments.ts";
import { Meter } from "../lib/logic/meter.ts";
import { normalise } from "../lib/logic/normal-forms/normalise.ts";
import type { NormalFormName, NormalFormValue } from "../lib/logic/normal-forms/result.ts";
import { findStructure } from "../lib/structures/search.ts";
import { claims, infiniteOnly, questions, readSentences } from "./support/corpora.ts";
import { expectHandled, expectKept } from "./support/kept.ts";
import { sentences } from "./support/random-formulas.ts";
import { type Reading, startOracle } from "./support/z3.ts";

const seed = Number(process.env.TWOPLACE_SEED ?? 20261201);
const options = (numRuns: number) => ({ seed, numRuns, verbose: 1 as const });

const R: RelationSymbol = { name: "R", places: 2, infix: false };
const P: RelationSymbol = { name: "P", places: 1, infix: false };
const FORMS: readonly NormalFormName[] = [
  "negation",
  "prenex",
  "miniscoped",
  "skolem",
  "clause",
  "definitional-clause",
  "disjunctive",
];

describe("what a form keeps", () => {
  it("is kept at every step, on all structures with one relation on 3 points", () => {
    fc.assert(
      fc.property(sentences([R], 3), (formula) => expectKept(formula, FORMS, 3, [R], 3)),
      options(150),
    );
  });

  it("is kept at every step, on all structures with two relations on 2 points", () => {
    fc.assert(
      fc.property(sentences([R, P], 3), (formula) => expectKept(formula, FORMS, 2, [R, P], 6)),
      options(500),
    );
  });

  it("is kept for the sentences of the corpora", () => {
    const texts = new Set([
      ...infiniteOnly.flatMap(({ axioms }) => axioms),
      ...claims.flatMap(({ premises, conclusion }) => [...premises, conclusion]),
    ]);
    let seen = 0;
    for (const text of texts) {
      const [sentence] = readSentences([text]);
      if (/\b[A-QS-Z]\(/.test(text)) continue;
      seen += 1;
      expectKept(sentence!, FORMS, 2, [R], 6);
    }
    expect(seen).toBeGreaterThan(100);
  });
});

describe("size", () => {
  it("the deepest formulas that a cell can hold come through or are refused, in every form", () => {
    expectHandled(400, FORMS);
  });
});

let ask: (declarations: string, assertions: readonly string[]) => Promise<Reading["answer"]>;
let close: () => void = () => {};

/** A limit on z3's own units of work, so that it ends at the same place each time. */
const WORK = 200_000;

beforeAll(async () => {
  const oracle = await startOracle();
  ask = async (declarations, assertions) => {
    const text = `${declarations}\n${assertions.map((one) => `(assert ${one})`).join("\n")}`;
    const { mistake, answer } = await oracle.read(text, { rlimit: WORK }, true);
    if (mistake !== null) throw new Error(`z3 does not read what was printed: ${mistake}`);
    return answer;
  };
  close = oracle.close;
});
afterAll(() => close());

/** Prints for z3: names of variables, functions and relations get different first letters. */
class Printer {
  readonly #declared = new Map<string, string>();

  formula(formula: TermFormula): string {
    switch (formula.kind) {
      case "true":
      case "false":
        return formula.kind;
      case "atom": {
        const name = `r_${formula.relation.name}`;
        this.#declare(name, formula.args.length, "Bool");
        return this.#apply(name, formula.args);
      }
      case "equal":
        return `(= ${this.#term(formula.left)} ${this.#term(formula.right)})`;
      case "not":
        return `(not ${this.formula(formula.body)})`;
      case "and":
      case "or":
        return `(${formula.kind} ${formula.parts.map((part) => this.formula(part)).join(" ")})`;
      case "implies":
        return `(=> ${this.formula(formula.left)} ${this.formula(formula.right)})`;
      case "iff":
        return `(= ${this.formula(formula.left)} ${this.formula(formula.right)})`;
      case "forall":
      case "exists":
        return `(${formula.kind} ((v_${formula.variable} U)) ${this.formula(formula.body)})`;
    }
  }

  clause(literals: readonly Literal[]): string {
    const parts = literals.map(({ positive, atom }) =>
      this.formula(positive ? atom : { kind: "not", body: atom }),
    );
    const body = `(or false ${parts.join(" ")})`;
    const variables = [...new Set([...body.matchAll(/\bv_[a-z0-9']+/g)].map(([name]) => name))];
    return variables.length === 0
      ? body
      : `(forall (${variables.map((name) => `(${name} U)`).join(" ")}) ${body})`;
  }

  value(value: NormalFormValue): string[] {
    if (value.kind !== "clauses") return [this.formula(value.formula)];
    return value.clauses.clauses.map(({ literals }) => this.clause(literals));
  }

  get declarations(): string {
    return ["(declare-sort U 0)", ...this.#declared.values()].join("\n");
  }

  #term(term: Term): string {
    if (typeof term === "string") return `v_${term}`;
    const name = `f_${term.symbol.name}`;
    this.#declare(name, term.args.length, "U");
    return this.#apply(name, term.args);
  }

  #apply(name: string, args: readonly Term[]): string {
    return args.length === 0 ? name : `(${name} ${args.map((arg) => this.#term(arg)).join(" ")})`;
  }

  #declare(name: string, places: number, sort: string): void {
    this.#declared.set(name, `(declare-fun ${name} (${"U ".repeat(places).trim()}) ${sort})`);
  }
}

/** Sentences to ask about: the corpora's, and random ones. */
function selection(): Formula[] {
  const texts = new Set([
    ...infiniteOnly.slice(0, 30).flatMap(({ axioms }) => axioms),
    ...questions.slice(0, 60).flatMap(({ premises, conclusion }) => [...premises, conclusion]),
  ]);
  const own = [...texts].slice(0, 60).map((text) => readSentences([text])[0]!);
  return [...own, ...fc.sample(sentences([R, P], 3), { seed, numRuns: 40 })];
}

describe("z3-solver", () => {
  it("finds no difference between a sentence and its equivalent forms", async () => {
    let settled = 0;
    let asked = 0;
    for (const sentence of selection())
      for (const form of ["negation", "prenex", "miniscoped", "disjunctive"] as const) {
        const result = normalise(sentence, form);
        if (result.outcome === "refused") continue;
        const printer = new Printer();
        const [before, [after]] = [printer.formula(sentence), printer.value(result.value)];
        const answer = await ask(printer.declarations, [`(not (= ${before} ${after}))`]);
        expect(answer, `${form}: ${before} and ${after}`).not.toBe(1);
        asked += 1;
        if (answer === -1) settled += 1;
      }
    expect(settled / asked).toBeGreaterThan(0.8);
  });

  it("derives a sentence from its Skolem and clause forms, and agrees on satisfiability", async () => {
    let settled = 0;
    let asked = 0;
    let compared = 0;
    for (const sentence of selection()) {
      const plain = new Printer();
      const before = plain.formula(sentence);
      const satisfiable = await ask(plain.declarations, [before]);
      for (const form of ["skolem", "clause", "definitional-clause"] as const) {
        const result = normalise(sentence, form);
        if (result.outcome === "refused") continue;
        const printer = new Printer();
        printer.formula(sentence);
        const after = printer.value(result.value);
        const answer = await ask(printer.declarations, [...after, `(not ${before})`]);
        expect(answer, `${form} of ${before}`).not.toBe(1);
        asked += 1;
        if (answer === -1) settled += 1;
        const alone = await ask(printer.declarations, after);
        if (alone === 0 || satisfiable === 0) continue;
        compared += 1;
        expect(alone, `${form} of ${before}`).toBe(satisfiable);
      }
    }
    expect(settled / asked).toBeGreaterThan(0.8);
    expect(compared / asked).toBeGreaterThan(0.5);
  });

  it("agrees with finite checks up to the published bound", async () => {
    let compared = 0;
    for (const sentence of fc.sample(sentences([R, P], 3), { seed: seed + 1, numRuns: 300 })) {
      const check = finiteCheckBound([sentence]);
      if (check === null || check.points > 4) continue;
      let found = false;
      for (let size = 1; size <= check.points && !found; size += 1)
        found =
          findStructure({ carrier: new Points(size), sentences: [sentence], relations: [R, P] }, new Meter())
            .result === "found";
      const printer = new Printer();
      const text = printer.formula(sentence);
      const answer = await ask(printer.declarations, [text]);
      if (answer === 0) continue;
      compared += 1;
      expect(answer === 1, text).toBe(found);
    }
    expect(compared).toBeGreaterThan(100);
  });
});
