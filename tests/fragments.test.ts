/** Fragments: published examples, sets without finite models, and bounds against exhaustive search. */
import fc from "fast-check";
import { describe, expect, it } from "vitest";
import { Points } from "../lib/carriers/points.ts";
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
  mapParts,
  not,
  or,
  type RelationSymbol,
  type Variable,
} from "../lib/logic/formula.ts";
import {
  describeSyntax,
  entailmentCheckBound,
  type FragmentName,
  finiteCheckBound,
  type SyntaxReport,
} from "../lib/logic/fragments.ts";
import { Meter } from "../lib/logic/meter.ts";
import { normalise } from "../lib/logic/normal-forms/normalise.ts";
import { prefixFrom } from "../lib/logic/normal-forms/prenex.ts";
import { findStructure } from "../lib/structures/search.ts";
import { allInterpretations, isTrue } from "./support/brute-force.ts";
import { claims, entryOf, infiniteOnly, questions, readSentences } from "./support/corpora.ts";
import { sentences } from "./support/random-formulas.ts";

const seed = Number(process.env.TWOPLACE_SEED ?? 20261201);
const options = (numRuns: number) => ({ seed, numRuns, verbose: 1 as const });

const R: RelationSymbol = { name: "R", places: 2, infix: false };
const P: RelationSymbol = { name: "P", places: 1, infix: false };
const Q: RelationSymbol = { name: "Q", places: 1, infix: false };

const describeTexts = (...texts: string[]): SyntaxReport => describeSyntax(readSentences(texts));
const fragmentsOf = (report: SyntaxReport): FragmentName[] =>
  report.fragments.map(({ fragment }) => fragment);
const prefixText = (report: SyntaxReport): string =>
  report.prefix!.map(({ kind, count }) => (kind === "forall" ? "A" : "E").repeat(count)).join("");

/** The size of a smallest model on at most so many points; null when there is none. */
function smallestModel(
  theory: readonly Formula[],
  relations: readonly RelationSymbol[],
  most: number,
): number | null {
  for (let size = 1; size <= most; size += 1) {
    const task = { carrier: new Points(size), sentences: theory, relations };
    const outcome = findStructure(task, new Meter());
    if (outcome.result === "ended") throw new Error("too much work");
    if (outcome.result === "found") return size;
  }
  return null;
}

describe("measures", () => {
  it.each([
    ["forall x y z. R(x,y) & R(y,z) -> R(x,z)", 3, 3, 3, "AAA"],
    ["forall x. exists y. R(x,y)", 2, 2, 2, "AE"],
    ["exists x y z. R(x,y) & R(y,z)", 3, 3, 2, "EEE"],
    ["(forall x. exists y. R(x,y)) & (exists y. forall x. R(x,y))", 2, 2, 2, "EAE"],
    ["(forall x. R(x,x)) | (forall y. exists z. ~R(y,z))", 2, 3, 2, "AAE"],
    ["~exists x. forall y. R(x,y) <-> ~R(y,y)", 2, 2, 2, "AE"],
    ["forall x. exists y. forall z. R(x,y) & (R(y,z) -> R(x,z))", 3, 3, 3, "AEA"],
    ["true", 0, 0, 0, ""],
  ] as const)("%s", (text, depth, variables, least, prefix) => {
    const report = describeTexts(text);
    expect(report.depth).toBe(depth);
    expect(report.variables).toBe(variables);
    expect(report.leastVariables).toBe(least);
    expect(prefixText(report)).toBe(prefix);
    const changes = [...prefix].filter((kind, index) => index > 0 && kind !== prefix[index - 1]).length;
    expect(report.alternations).toBe(changes);
  });

  it("agree with the prenex form that is shown", () => {
    fc.assert(
      fc.property(sentences([R, P], 3), (sentence) => {
        const prenex = normalise(sentence, "prenex");
        if (prenex.outcome === "refused" || prenex.value.kind !== "formula")
          throw new Error("no prenex form");
        let text = "";
        for (let f = prenex.value.formula; f.kind === "forall" || f.kind === "exists"; f = f.body)
          text += f.kind === "forall" ? "A" : "E";
        expect(prefixText(describeSyntax([sentence]))).toBe(text);
      }),
      options(300),
    );
  });

  it("so many variables do suffice: names are used again, and the sentence stays equivalent", () => {
    const structures = [1, 2].flatMap((size) =>
      [...allInterpretations(size, [R, P])].map((structure) => ({ size, structure })),
    );
    fc.assert(
      fc.property(sentences([R, P], 3), (sentence) => {
        const { leastVariables } = describeSyntax([sentence]);
        const forms = (["negation", "miniscoped"] as const).map((form) => {
          const result = normalise(sentence, form);
          if (result.outcome === "refused" || result.value.kind !== "formula") throw new Error("no form");
          return result.value.formula;
        });
        const names = ["u", "v", "w"].slice(0, leastVariables);
        const rewritten = forms.map((form) => withNames(form, names, new Map())).find((one) => one !== null);
        expect(rewritten).toBeDefined();
        for (const { size, structure } of structures)
          expect(isTrue(rewritten!, size, structure)).toBe(isTrue(sentence, size, structure));
      }),
      options(200),
    );
  });
});

/** A formula with bound variables named from a list, used again where they can be; null where the list is too short. */
function withNames(
  formula: Formula,
  names: readonly string[],
  as: ReadonlyMap<Variable, string>,
): Formula | null {
  switch (formula.kind) {
    case "atom":
      return { ...formula, args: formula.args.map((arg) => as.get(arg)!) };
    case "equal":
      return equal(as.get(formula.left)!, as.get(formula.right)!);
    case "forall":
    case "exists": {
      if (!freeVariables(formula.body).includes(formula.variable)) return withNames(formula.body, names, as);
      const inUse = freeVariables(formula).map((variable) => as.get(variable)!);
      const name = names.find((one) => !inUse.includes(one));
      if (name === undefined) return null;
      const body = withNames(formula.body, names, new Map([...as, [formula.variable, name]]));
      return body === null ? null : { ...formula, variable: name, body };
    }
    default: {
      let failed = false;
      const result = mapParts(formula, (part) => {
        const inner = withNames(part, names, as);
        if (inner === null) failed = true;
        return inner ?? part;
      });
      return failed ? null : result;
    }
  }
}

/** Entries of category g, with the sources that stand in the file; examples are its own. */
describe("published examples", () => {
  const example = (id: string, which: "example_in" | "example_out") =>
    (entryOf(id).statement as Record<string, string>)[which]!;

  it.each([
    ["bernays-schoenfinkel-ramsey", "g-bernays-schoenfinkel"],
    ["ackermann", "g-ackermann"],
    ["two-variable", "g-two-variable"],
    ["maslov", "g-maslov"],
    ["aea-krom", "g-aea-krom"],
  ] as const)("%s: the example in it, and the one outside", (fragment, id) => {
    const inside = describeTexts(example(id, "example_in"));
    expect(fragmentsOf(inside)).toContain(fragment);
    const { decidable, finiteModelProperty } = inside.fragments.find((one) => one.fragment === fragment)!;
    const { decidable: published, finite_model_property } = entryOf(id).expected as Record<string, boolean>;
    expect(decidable === "yes").toBe(published);
    expect(finiteModelProperty).toBe(finite_model_property);
    expect(fragmentsOf(describeTexts(example(id, "example_out")))).not.toContain(fragment);
  });

  it("the monadic class, coded by loops (example in words in the file)", () => {
    expect(fragmentsOf(describeTexts("forall x y. R(x,x) -> ~R(y,y)"))).toContain("monadic");
    expect(fragmentsOf(describeTexts(example("g-monadic", "example_out")))).not.toContain("monadic");
    const { finite_model_property } = entryOf("g-monadic").expected as Record<string, unknown>;
    expect(
      describeTexts("forall x. R(x,x)").fragments.find((one) => one.fragment === "monadic"),
    ).toMatchObject({
      finiteModelProperty: finite_model_property,
      points: 2,
    });
  });

  it("two variables with counting: one successor, at most one predecessor, a point without (in words in the file)", () => {
    const theory = [
      "forall x. exists y. R(x,y)",
      "forall x y z. R(x,y) & R(x,z) -> y = z",
      "forall x y z. R(x,z) & R(y,z) -> x = y",
      "exists y. forall x. ~R(x,y)",
    ];
    expect(fragmentsOf(describeTexts(...theory))).toEqual(["two-variable-counting"]);
    expect(describeTexts(...theory).fragments[0]).toMatchObject({
      decidable: "yes",
      finiteModelProperty: false,
    });
    expect(fragmentsOf(describeTexts("exists x y z. x != y & R(x,z) & R(y,z)"))).toContain(
      "two-variable-counting",
    );
    const outside = example("g-two-variable-counting", "example_out");
    expect(fragmentsOf(describeTexts(outside))).not.toContain("two-variable-counting");
    // Only one side says that y and z are the same; the literals differ.
    const lopsided = ["forall x y z. R(x,y) & R(z,x) -> y = z", "forall x. exists y. R(x,y)"];
    expect(fragmentsOf(describeTexts(...lopsided))).not.toContain("two-variable-counting");
  });

  it("two variables with one transitive relation", () => {
    const order = [
      "forall x. ~R(x,x)",
      "forall x y z. R(x,y) & R(y,z) -> R(x,z)",
      "forall x. exists y. R(x,y)",
    ];
    const report = describeTexts(...order);
    expect(fragmentsOf(report)).toEqual(["two-variable-one-transitive"]);
    expect(report.fragments[0]!.decidable).toBe("finite-only");
    expect(report.finiteCheck).toBeNull();
    const outside = example("g-two-variable-one-transitive", "example_out");
    expect(fragmentsOf(describeTexts(outside))).not.toContain("two-variable-one-transitive");
    const two = [...order, "forall x y z. S(x,y) & S(y,z) -> S(x,z)"];
    expect(fragmentsOf(describeTexts(...two))).toEqual([]);
  });

  it("Gödel–Kalmár–Schütte: two universal variables in the middle, no identity (Gödel 1932)", () => {
    const inside = "forall x y. exists z w. R(x,z) & ~R(z,x) & (R(x,y) -> R(y,w))";
    expect(fragmentsOf(describeTexts(inside))).toContain("goedel-kalmar-schuette");
    const withIdentity = "forall x y. exists z. R(x,z) & ~R(z,x) & (R(x,y) -> y = z | R(y,z))";
    expect(fragmentsOf(describeTexts(withIdentity))).not.toContain("goedel-kalmar-schuette");
    expect(
      fragmentsOf(describeTexts("forall x y z. exists w. R(x,w) & (R(x,y) -> R(y,z) | R(w,z))")),
    ).toEqual([]);
  });

  it("the maximal classes with and without the finite model property (five of seven have it)", () => {
    const { finite_model_property } = entryOf("g-decidable-maximal").expected as Record<string, number>;
    expect(finite_model_property).toBe(5);
    // Without functions, four of the seven can be met here, and all of these have it.
    for (const text of [
      "exists x. forall y. R(x,y)",
      "forall x y. exists z. R(x,z) & ~R(z,y)",
      "forall x. exists y. R(x,y) & ~R(y,x)",
      "exists x y. R(x,x) & ~R(y,y)",
    ]) {
      const maximal = describeTexts(text).fragments.filter(({ maximalClass }) => maximalClass !== null);
      expect(maximal.length).toBeGreaterThan(0);
      for (const { finiteModelProperty } of maximal) expect(finiteModelProperty).toBe(true);
    }
    // Two classes allow identity beside one unary function (Rabin, Shelah).
    const classOf = (text: string, fragment: FragmentName) =>
      describeTexts(text).fragments.find((one) => one.fragment === fragment)?.maximalClass;
    expect(classOf("forall x. exists y. x != y & R(x,y)", "ackermann")).toContain("Shelah");
    expect(classOf("forall x. exists y. x != y & R(y,y)", "monadic")).toContain("Rabin");
    expect(classOf("forall x. exists y. R(y,y)", "monadic")).toContain("Löb");
  });
});

describe("sets that have models and no finite ones", () => {
  // tests/data/infinite-only.json, claims.json and questions.json, with their own sources.
  const sets = [
    ...infiniteOnly.map(({ id, axioms }) => ({ id, theory: () => readSentences(axioms) })),
    ...[...claims, ...questions]
      .filter(({ expected }) => expected === "only infinite countermodels")
      .map(({ id, premises, conclusion }) => ({
        id,
        theory: () => {
          const all = readSentences([...premises, conclusion]);
          return [...all.slice(0, -1), not(all.at(-1)!)];
        },
      })),
  ];

  it("there are many", () => {
    expect(sets.length).toBeGreaterThan(50);
  });

  it.each(sets)("$id is in no fragment with the finite model property", ({ theory }) => {
    const given = theory();
    const report = describeSyntax(given);
    expect(report.fragments.filter(({ finiteModelProperty }) => finiteModelProperty)).toEqual([]);
    expect(report.finiteCheck).toBeNull();
    expect(finiteCheckBound(given)).toBeNull();
    // Written as one sentence too.
    expect(describeSyntax([and(...given)]).fragments.filter((one) => one.finiteModelProperty)).toEqual([]);
  });
});

describe("bounds", () => {
  /** Quantifier-free formulas over some variables. */
  const matrices = (relations: readonly RelationSymbol[], names: readonly string[], identity: boolean) => {
    const variable = fc.constantFrom(...names);
    const atoms = fc
      .constantFrom(...relations)
      .chain((relation) =>
        fc
          .array(variable, { minLength: relation.places, maxLength: relation.places })
          .map((args) => atom(relation, ...args)),
      );
    const leaf = identity
      ? fc.oneof(
          { weight: 2, arbitrary: atoms },
          { weight: 1, arbitrary: fc.tuple(variable, variable).map(([x, y]) => equal(x, y)) },
        )
      : atoms;
    const literal = fc.tuple(leaf, fc.boolean()).map(([one, sign]) => (sign ? one : not(one)));
    const clause = fc.array(literal, { minLength: 1, maxLength: 3 }).map((parts) => or(...parts));
    return fc.array(clause, { minLength: 1, maxLength: 6 }).map((parts) => and(...parts));
  };
  const ramsey = (prefix: readonly string[]) =>
    matrices([R, P], [...prefix, "x", "y", "z"], true).map((matrix) =>
      exists([...prefix], forall(["x", "y", "z"], matrix)),
    );
  /** Sentences about unary relations, quantifiers nested at random, names used again. */
  const monadic = (identity: boolean) =>
    fc
      .tuple(
        sentences([P, Q], 3).filter((one) => identity || !JSON.stringify(one).includes("equal")),
        fc.boolean(),
      )
      .map(([sentence, deny]) => (deny ? not(sentence) : sentence));

  const expectBound = (theory: readonly Formula[], relations: readonly RelationSymbol[], most: number) => {
    const check = finiteCheckBound(theory);
    if (check === null) return null;
    const size = smallestModel(theory, relations, most);
    if (size !== null) expect(size, `${check.reason}: ${check.points}`).toBeLessThanOrEqual(check.points);
    return size;
  };

  it.each([0, 1, 2, 3])(
    "∃*∀* with %i existential quantifiers: a model within the bound when there is one on 4 points",
    (k) => {
      let tight = 0;
      fc.assert(
        fc.property(ramsey(["a", "b", "c"].slice(0, k)), (sentence) => {
          const check = finiteCheckBound([sentence]);
          expect(check).not.toBeNull();
          expect(check!.points).toBeLessThanOrEqual(Math.max(1, k));
          if (expectBound([sentence], [R, P], 4) === check!.points) tight += 1;
        }),
        options(250),
      );
      expect(tight).toBeGreaterThan(0);
    },
  );

  it("the bound k is met: k points that are all different", () => {
    for (let k = 1; k <= 4; k += 1) {
      const names = Array.from({ length: k }, (_, i) => `x${i}`);
      const different = names.flatMap((x, i) => names.slice(i + 1).map((y) => not(equal(x, y))));
      const sentence = exists(names, and(...different));
      expect(describeSyntax([sentence]).fragments[0]).toMatchObject({ points: k });
      expect(smallestModel([sentence], [R], 5)).toBe(k);
    }
  });

  it("the monadic bounds are met: all combinations of relations, each so often", () => {
    const has = (x: string, p: boolean, q: boolean) =>
      and(p ? atom(P, x) : not(atom(P, x)), q ? atom(Q, x) : not(atom(Q, x)));
    const kinds = [0, 1, 2, 3].map((code) => [code % 2 === 1, code > 1] as const);
    const once = kinds.map(([p, q]) => exists("x", has("x", p, q)));
    // ∃*: four witnesses, so this bound is the same as that of ∃*∀*; to see the monadic one, forbid that prefix.
    const nested = forall(
      "y",
      and(...kinds.map(([p, q]) => exists("x", and(has("x", p, q), iff(atom(P, "y"), atom(P, "y")))))),
    );
    expect(finiteCheckBound(once)).toMatchObject({ points: 4 });
    expect(finiteCheckBound([nested])).toMatchObject({ points: 4 });
    expect(smallestModel(once, [P, Q], 5)).toBe(4);
    const twice = forall(
      "x",
      exists(
        "y",
        and(not(equal("x", "y")), iff(atom(P, "x"), atom(P, "y")), iff(atom(Q, "x"), atom(Q, "y"))),
      ),
    );
    const both = [twice, exists("x", atom(P, "x")), exists("x", not(atom(P, "x")))];
    expect(smallestModel(both, [P, Q], 6)).toBe(4);
    expect(finiteCheckBound([twice])).toMatchObject({ points: 2 * 2 ** 2 });
  });

  it.each([true, false])(
    "monadic sentences (identity: %s): a model within the bound when there is one on 6 points",
    (identity) => {
      let decided = 0;
      fc.assert(
        fc.property(monadic(identity), monadic(identity), (one, other) => {
          expect(finiteCheckBound([one, other])).not.toBeNull();
          if (expectBound([one, other], [P, Q], 6) !== null) decided += 1;
        }),
        options(250),
      );
      expect(decided).toBeGreaterThan(50);
    },
  );

  it("monadic sentences with one relation: a model within 2·3 points when there is one on 8", () => {
    fc.assert(
      fc.property(sentences([P], 3), sentences([P], 3), (one, other) => {
        expect(finiteCheckBound([one, other])!.points).toBeLessThanOrEqual(6);
        expectBound([one, other], [P], 8);
      }),
      options(150),
    );
  });

  it("∃*∀* and monadic sentences together", () => {
    let mixed = 0;
    fc.assert(
      fc.property(ramsey(["a", "b"]), monadic(true), (one, other) => {
        const check = finiteCheckBound([one, other]);
        expect(check).not.toBeNull();
        if (check!.reason.includes("together")) mixed += 1;
        expectBound([one, other], [R, P, Q], 5);
      }),
      options(150),
    );
    expect(mixed).toBeGreaterThan(5);
  });

  it("whatever the sentence, a bound that is given is right on up to 4 points", () => {
    let given = 0;
    fc.assert(
      fc.property(sentences([R, P], 3), sentences([R, P], 2), (one, other) => {
        if (expectBound([one, other], [R, P], 4) !== null) given += 1;
      }),
      options(400),
    );
    expect(given).toBeGreaterThan(100);
  });

  it("a countermodel of an entailment: premises and the negated conclusion", () => {
    const symmetric = forall(["x", "y"], implies(atom(R, "x", "y"), atom(R, "y", "x")));
    const reflexive = forall("x", atom(R, "x", "x"));
    expect(entailmentCheckBound([symmetric], reflexive)).toMatchObject({ points: 1 });
    const transitive = forall(
      ["x", "y", "z"],
      implies(and(atom(R, "x", "y"), atom(R, "y", "z")), atom(R, "x", "z")),
    );
    expect(entailmentCheckBound([symmetric], transitive)).toMatchObject({ points: 3 });
    // The negated conclusion is in the fragment, the premise is not.
    expect(entailmentCheckBound([forall("x", exists("y", atom(R, "x", "y")))], transitive)).toBeNull();
  });

  it("the entailments between universal sentences in the corpora fail within the bound or not at all", () => {
    // claims.json and questions.json: "holds" and smallest countermodels, as their notation lines say.
    let seen = 0;
    for (const { id, premises, conclusion, expected } of [...claims, ...questions]) {
      const all = readSentences([...premises, conclusion]);
      const check = entailmentCheckBound(all.slice(0, -1), all.at(-1)!);
      if (check === null || check.points > 4) continue;
      seen += 1;
      const theory = [...all.slice(0, -1), not(all.at(-1)!)];
      const relations = relationsOfAll(theory);
      expect(smallestModel(theory, relations, check.points) === null, id).toBe(expected === "holds");
    }
    expect(seen).toBeGreaterThan(30);
  });
});

function relationsOfAll(theory: readonly Formula[]): RelationSymbol[] {
  const found = new Map<string, RelationSymbol>();
  const look = (formula: Formula): Formula => {
    if (formula.kind === "atom") found.set(formula.relation.name, formula.relation);
    return mapParts(formula, look);
  };
  for (const formula of theory) look(formula);
  return [...found.values()];
}

describe("shapes", () => {
  it("a sentence said to be in ∃*∀²∃* or ∃*∀∃* has that prefix in one of its forms", () => {
    let seen = 0;
    fc.assert(
      fc.property(sentences([R, P], 3), (sentence) => {
        const fragments = fragmentsOf(describeSyntax([sentence]));
        const most = fragments.includes("ackermann")
          ? 1
          : fragments.includes("goedel-kalmar-schuette")
            ? 2
            : null;
        if (most === null) return;
        seen += 1;
        const fits = (["prenex", "miniscoped"] as const).some((form) => {
          const result = normalise(sentence, form);
          if (result.outcome === "refused" || result.value.kind !== "formula") throw new Error("no form");
          const { counts } = prefixFrom("exists", result.value.formula);
          return counts.length <= 3 && (counts[1] ?? 0) <= most;
        });
        expect(fits).toBe(true);
      }),
      options(400),
    );
    expect(seen).toBeGreaterThan(50);
  });

  it("no fragment and no bound is claimed of what is too large to bring to a normal form", () => {
    let sentence: Formula = atom(R, "x", "x");
    for (let i = 0; i < 60; i += 1) sentence = iff(sentence, exists("y", atom(R, "x", "y")));
    const report = describeSyntax([forall("x", exists("z", and(sentence, atom(R, "z", "x"))))]);
    expect(report.prefix).toBeNull();
    expect(report.fragments).toEqual([]);
    expect(report.finiteCheck).toBeNull();
  });

  it("the same sentences in another order are in the same fragments", () => {
    fc.assert(
      fc.property(sentences([R, P], 2), sentences([R, P], 2), (one, other) => {
        const [left, right] = [describeSyntax([one, other]), describeSyntax([other, one])];
        expect(fragmentsOf(left)).toEqual(fragmentsOf(right));
        expect(left.finiteCheck?.points).toBe(right.finiteCheck?.points);
      }),
      options(100),
    );
  });
});
