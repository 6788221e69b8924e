/** Derivations written by hand: each rule at work, and near misses of every condition that makes it sound. */
import { describe, expect, it } from "vitest";
import { checkEvidence } from "../lib/evidence/check.ts";
import { digestOf } from "../lib/evidence/digest.ts";
import {
  type DerivationFact,
  EVIDENCE_FORMAT,
  EVIDENCE_VERSION,
  type Evidence,
  type FormulaRecord,
  type LineRecord,
  type LiteralRecord,
  type MadeFormula,
  type TermFormulaRecord,
  type TermRecord,
} from "../lib/evidence/format.ts";
import { Meter } from "../lib/logic/meter.ts";

const is = (name: string, ...args: TermRecord[]) => ["is", name, ...args] as const;
const not = (atom: ReturnType<typeof is> | readonly ["=", TermRecord, TermRecord]) => ["not", atom] as const;
const same = (left: TermRecord, right: TermRecord) => ["=", left, right] as const;
const all = (variables: string, body: TermFormulaRecord) =>
  [...variables].reduceRight<TermFormulaRecord>((inner, variable) => ["forall", variable, inner], body);
const some = (variables: string, body: TermFormulaRecord) =>
  [...variables].reduceRight<TermFormulaRecord>((inner, variable) => ["exists", variable, inner], body);

const irreflexive = all("x", ["not", is("R", "x", "x")]);
const transitive = all("xyz", ["implies", ["and", is("R", "x", "y"), is("R", "y", "z")], is("R", "x", "z")]);
const asymmetric = all("xy", ["implies", is("R", "x", "y"), ["not", is("R", "y", "x")]]);
const serial = all("x", some("y", is("R", "x", "y")));
const falsum: FormulaRecord = ["false"];

/** Evidence that the last sentence follows from the others by one derivation. */
function evidenceOf(
  sentences: readonly FormulaRecord[],
  lines: readonly LineRecord[],
  made: readonly MadeFormula[] = [],
  change: Partial<DerivationFact> = {},
): Evidence {
  const premises = [...sentences.keys()].slice(0, -1);
  const question = { ask: "entails", premises, conclusion: premises.length } as const;
  return {
    format: EVIDENCE_FORMAT,
    version: EVIDENCE_VERSION,
    sentences,
    question,
    digest: digestOf(sentences, question),
    verdict: "holds",
    facts: [{ fact: "derivation", premises, conclusion: premises.length, made, lines, ...change }],
  };
}

/** Why the evidence is rejected; empty when it is accepted. */
function reasonFor(evidence: Evidence): string {
  const result = checkEvidence(JSON.parse(JSON.stringify(evidence)));
  return result.accepted ? "" : result.reason;
}

describe("clauses and inferences", () => {
  const sentences = [irreflexive, transitive, asymmetric];
  const clauses: LineRecord[] = [
    ["clause", 0, 0],
    ["clause", 1, 0],
    ["clause", 2, 0],
    ["clause", 2, 1],
  ];
  const step: LineRecord = [
    "infer",
    [not(is("R", "x", "y")), not(is("R", "y", "x"))],
    [
      [0, {}],
      [1, { z: "x" }],
    ],
  ];
  const last: LineRecord = [
    "infer",
    [],
    [
      [4, { x: ["2.0"], y: ["2.1"] }],
      [2, {}],
      [3, {}],
    ],
  ];
  const lines = [...clauses, step, last];

  it("a strict order is asymmetric", () => {
    expect(reasonFor(evidenceOf(sentences, lines))).toBe("");
  });

  it("the same in one line, by propagation through instances", () => {
    const once: LineRecord = [
      "infer",
      [],
      [
        [0, { x: ["2.0"] }],
        [1, { x: ["2.0"], y: ["2.1"], z: ["2.0"] }],
        [2, {}],
        [3, {}],
      ],
    ];
    expect(reasonFor(evidenceOf(sentences, [...clauses, once]))).toBe("");
  });

  it("a clause may be weakened, and a variable renamed", () => {
    const weaker: LineRecord = ["infer", [is("R", "u", "v"), not(is("R", "u", "u"))], [[0, { x: "u" }]]];
    expect(reasonFor(evidenceOf(sentences, [...lines.slice(0, 5), weaker, last]))).toBe("");
  });

  it.each<[string, readonly LineRecord[], RegExp]>([
    ["no lines", [], /not the empty clause/],
    ["no empty clause at the end", lines.slice(0, -1), /not the empty clause/],
    ["the empty clause not at the end", [...lines, step], /not the empty clause/],
    ["a line that uses itself", lines.with(5, ["infer", [], [[5, {}]]]), /no line 5 before/],
    ["a line that uses a later one", lines.with(4, ["infer", [], [[5, {}]]]), /no line 5 before/],
    ["a clause of no formula", lines.with(0, ["clause", 3, 0]), /no formula 3/],
    ["a clause that its formula does not have", lines.with(0, ["clause", 0, 1]), /no clause 1/],
    [
      "a premise left out",
      lines.with(4, ["infer", step[1] as never, [[1, { z: "x" }]]]),
      /line 4 does not follow/,
    ],
    [
      "another substitution",
      lines.with(5, [
        "infer",
        [],
        [
          [4, { x: ["2.0"], y: ["2.0"] }],
          [2, {}],
          [3, {}],
        ],
      ]),
      /line 5 does not follow/,
    ],
    [
      "functions of another formula",
      lines.with(5, [
        "infer",
        [],
        [
          [4, { x: ["1.0"], y: ["1.1"] }],
          [2, {}],
          [3, {}],
        ],
      ]),
      /line 5 does not follow/,
    ],
    [
      "a variable for all in place of one",
      lines.with(5, [
        "infer",
        [],
        [
          [0, {}],
          [2, {}],
        ],
      ]),
      /line 5 does not follow/,
    ],
    [
      "an opposite literal",
      lines.with(4, [
        "infer",
        [is("R", "x", "y"), not(is("R", "y", "x"))],
        [
          [0, {}],
          [1, { z: "x" }],
        ],
      ]),
      /line 4 does not follow/,
    ],
  ])("%s", (_, changed, reason) => {
    expect(reasonFor(evidenceOf(sentences, changed))).toMatch(reason);
  });

  it("a choice of one line is not the same in another: variables of instances are constants", () => {
    // From R(x, x) for some choice of x nothing follows about another.
    const loop = some("x", is("R", "x", "x"));
    const wrong: LineRecord[] = [
      ["clause", 0, 0],
      ["clause", 1, 0],
      [
        "infer",
        [],
        [
          [0, {}],
          [1, { x: "y" }],
        ],
      ],
    ];
    expect(reasonFor(evidenceOf([loop, all("x", is("R", "x", "x"))], wrong))).toMatch(
      /line 2 does not follow/,
    );
  });

  it("premises of another theory, and another conclusion", () => {
    const stranger = evidenceOf(sentences, lines);
    const question = { ask: "entails", premises: [0], conclusion: 2 } as const;
    expect(reasonFor({ ...stranger, question, digest: digestOf(sentences, question) })).toMatch(/bear out/);
    const other = { ask: "entails", premises: [0, 2], conclusion: 1 } as const;
    expect(reasonFor({ ...stranger, question: other, digest: digestOf(sentences, other) })).toMatch(
      /bear out/,
    );
  });

  it("a contradiction shows whatever is asked; of premises that have one and no negated conclusion", () => {
    const lines: LineRecord[] = [
      ["clause", 0, 0],
      ["clause", 1, 0],
      [
        "infer",
        [],
        [
          [0, { x: ["1.0"] }],
          [1, {}],
        ],
      ],
    ];
    const sentences = [irreflexive, some("x", is("R", "x", "x")), serial];
    expect(reasonFor(evidenceOf(sentences, lines, [], { conclusion: null }))).toBe("");
    expect(reasonFor(evidenceOf(sentences, lines, [], { conclusion: null, premises: [0] }))).toMatch(
      /no formula 1/,
    );
  });
});

describe("identity", () => {
  /** Two clauses about R, a statement about identity, and the contradiction. */
  const sentences: FormulaRecord[] = [
    all("xy", ["implies", is("R", "x", "y"), same("x", "y")]),
    some("xyz", ["and", is("R", "x", "y"), is("R", "y", "z"), ["not", same("x", "z")]]),
    falsum,
  ];
  const [a, b, c]: TermRecord[] = [["1.0"], ["1.1"], ["1.2"]];
  const chain: LiteralRecord[] = [not(same(a!, b!)), not(same(b!, c!)), same(a!, c!)];
  const lines = (identity: readonly LiteralRecord[]): LineRecord[] => [
    ["clause", 0, 0],
    ["clause", 1, 0],
    ["clause", 1, 1],
    ["clause", 1, 2],
    ["identity", identity],
    [
      "infer",
      [],
      [
        [0, { x: a!, y: b! }],
        [0, { x: b!, y: c! }],
        [1, {}],
        [2, {}],
        [3, {}],
        [4, {}],
      ],
    ],
  ];

  it("identity is transitive, with the rewriting done in order", () => {
    expect(reasonFor(evidenceOf(sentences, lines(chain), [], { conclusion: null }))).toBe("");
  });

  it.each<[string, readonly LiteralRecord[], boolean]>([
    ["t = t", [same("x", "x")], true],
    ["t = t under functions", [same(["0.0", "x"], ["0.0", "x"])], true],
    ["opposite literals", [is("R", "x", "y"), not(is("R", "x", "y"))], true],
    ["from left to right", [not(same("x", "y")), same("y", "x")], true],
    ["functions of the same are the same", [not(same("x", "y")), same(["0.0", "x"], ["0.0", "y"])], true],
    ["relations of the same", [not(same("x", "y")), not(is("R", "x", "z")), is("R", "y", "z")], true],
    ["inside of terms", [not(same("x", ["0.0", "x"])), same("x", ["0.0", ["0.0", "x"]])], false],
    [
      "once only: f(f(x)) becomes f(x), not x",
      [not(same(["0.0", "x"], "x")), same("x", ["0.0", ["0.0", "x"]])],
      false,
    ],
    ["nothing", [], false],
    ["two different things", [same("x", "y")], false],
    ["an identity that is not negated", [same("x", "y"), same("y", "x")], false],
    ["t ≠ t", [not(same("x", "x"))], false],
    ["another relation", [not(same("x", "y")), not(is("R", "x", "z")), is("S", "y", "z")], false],
    ["other places", [not(same("x", "y")), not(is("R", "x")), is("R", "y", "y")], false],
    ["another function", [not(same("x", "y")), same(["0.0", "x"], ["0.1", "y"])], false],
    ["both negated", [not(same("x", "y")), not(is("R", "x")), not(is("R", "y"))], false],
    ["the identity itself as what is shown", [not(same("x", "y"))], false],
  ])("%s", (_, clause, accepted) => {
    const evidence = evidenceOf(
      sentences,
      [...lines(chain).slice(0, 5), ["identity", clause], lines(chain)[5]!],
      [],
      {
        conclusion: null,
      },
    );
    if (accepted) expect(reasonFor(evidence)).toBe("");
    else expect(reasonFor(evidence)).toMatch(/line 5 is not true by the laws of identity/);
  });

  it("s = t is not t = s without a line that says so", () => {
    const flipped = [not(same(a!, b!)), not(same(b!, c!)), same(c!, a!)];
    expect(reasonFor(evidenceOf(sentences, lines(flipped), [], { conclusion: null }))).toMatch(
      /does not follow/,
    );
  });

  it("terms that grow without end are refused", () => {
    const doubling = Array.from({ length: 40 }, (_, i) =>
      not(same(`x${i}`, ["0.0", `x${i + 1}`, `x${i + 1}`])),
    );
    const clause: LiteralRecord[] = [...doubling, same("x0", "y")];
    expect(reasonFor(evidenceOf(sentences, [["identity", clause]], [], { conclusion: null }))).toMatch(
      /too large/,
    );
  });
});

describe("made formulas", () => {
  const contradiction = (formula: number): LineRecord[] => [
    ["clause", formula, 0],
    ["infer", [], [[0, {}]]],
  ];

  it("a definition is true of what it defines", () => {
    // d(x) ↔ ∃y R(x, y); ∀x d(x) by folding, and its unfolding contradicts the negated conclusion.
    const made: MadeFormula[] = [
      ["define", "d", ["x"], some("y", is("R", "x", "y"))],
      ["fold", 0, 2, all("z", is("d", "z"))],
      ["unfold", 3, 2],
    ];
    const lines: LineRecord[] = [
      ["clause", 4, 0],
      ["clause", 1, 0],
      [
        "infer",
        [],
        [
          [0, { z: ["1.0"], x: ["1.0"] }],
          [1, { y: ["4.0", ["1.0"]] }],
        ],
      ],
    ];
    expect(reasonFor(evidenceOf([serial, serial], lines, made))).toBe("");
    const [, clause] = lines;
    expect(reasonFor(evidenceOf([serial, serial], [["clause", 3, 0], clause!, lines[2]!], made))).toMatch(
      /line 2/,
    );
  });

  it.each<[string, MadeFormula[], RegExp]>([
    ["a relation of a premise", [["define", "R", ["x", "y"], ["false"]]], /R occurs in a formula before/],
    ["the same with other places", [["define", "R", ["x"], ["false"]]], /R occurs in a formula before/],
    ["a relation of the conclusion", [["define", "S", ["x"], ["false"]]], /S occurs in a formula before/],
    ["its own relation", [["define", "d", ["x"], ["not", is("d", "x")]]], /d occurs in its own definition/],
    [
      "its own with other places",
      [["define", "d", ["x"], ["not", is("d", "x", "x")]]],
      /d occurs in its own/,
    ],
    [
      "a relation that is defined already",
      [
        ["define", "d", ["x"], ["true"]],
        ["define", "d", ["x"], ["false"]],
      ],
      /d occurs in a formula before/,
    ],
    [
      "a relation that a definition before uses",
      [
        ["define", "d", ["x"], is("e", "x")],
        ["define", "e", ["x"], ["not", is("d", "x")]],
      ],
      /e occurs in a formula before/,
    ],
    [
      "a relation that a folded formula uses",
      [
        ["define", "d", ["x", "y"], ["true"]],
        ["fold", 0, 2, ["false"]],
      ],
      /does not unfold/,
    ],
    ["a variable too many", [["define", "d", ["x"], is("e", "x", "y")]], /y is free/],
    ["a variable twice", [["define", "d", ["x", "x"], is("e", "x")]], /occurs twice/],
    ["a function of its own", [["define", "d", ["x"], is("e", ["2.0", "x"])]], /2\.0 does not belong/],
    ["a function of a later formula", [["define", "d", ["x"], is("e", ["7.0"])]], /7\.0 does not belong/],
    ["a function without number", [["define", "d", ["x"], is("e", ["f"])]], /function f does not belong/],
    [
      "a function number with zeros before",
      [["define", "d", ["x"], is("e", ["01.0"])]],
      /01\.0 does not belong/,
    ],
    ["unfolding of no formula", [["unfold", 9, 0]], /no formula 9/],
    ["unfolding of itself", [["unfold", 2, 0]], /no formula 2/],
    ["unfolding by what is no definition", [["unfold", 0, 0]], /formula 0 is not a definition/],
    ["miniscoping of itself", [["miniscope", 2]], /no formula 2/],
    ["folding by what is no definition", [["fold", 0, 0, ["true"]]], /formula 0 is not a definition/],
    [
      "folding to another formula",
      [
        ["define", "d", ["x"], is("R", "x", "x")],
        ["fold", 0, 2, all("x", is("d", "x"))],
      ],
      /does not unfold to formula 0/,
    ],
    [
      "folding to a formula with a free variable",
      [
        ["define", "d", ["x", "y"], is("R", "x", "x")],
        ["fold", 0, 2, all("x", ["not", is("d", "x", "z")])],
      ],
      /free variable/,
    ],
    [
      "folding to a formula with a later function",
      [
        ["define", "d", ["x", "y"], is("R", "x", "x")],
        ["fold", 0, 2, all("x", ["not", is("d", "x", ["3.0"])])],
      ],
      /3\.0 does not belong/,
    ],
  ])("%s", (_, made, reason) => {
    expect(reasonFor(evidenceOf([irreflexive, some("x", is("S", "x"))], contradiction(0), made))).toMatch(
      reason,
    );
  });

  it.each<[string, FormulaRecord]>([
    ["no equivalence", all("x", ["implies", is("d", "x"), is("R", "x", "x")])],
    ["sides exchanged", all("x", ["iff", ["not", is("d", "x")], is("R", "x", "x")])],
    ["a variable twice", all("x", ["iff", is("d", "x", "x"), is("R", "x", "x")])],
    ["a variable that is no argument", all("xy", ["iff", is("d", "x"), is("R", "x", "y")])],
    ["an existential quantifier", some("x", ["iff", is("d", "x"), is("R", "x", "x")])],
  ])("no definition: %s", (_, formula) => {
    const evidence = evidenceOf([formula, formula, falsum], contradiction(0), [["unfold", 0, 1]], {
      conclusion: null,
    });
    expect(reasonFor(evidence)).toMatch(/formula 1 is not a definition/);
  });

  it("unfolding does not capture: from ∀y ∃z (z is above y) for d nothing follows about R(z, z)", () => {
    // d(x) ↔ ∃y R(y, x). Unfolded in ∃y ¬d(y), the inner y is another one.
    const definition = all("x", ["iff", is("d", "x"), some("y", is("R", "y", "x"))]);
    const sentences = [definition, some("y", ["not", is("d", "y")]), falsum];
    const made: MadeFormula[] = [["unfold", 1, 0]];
    const lines: LineRecord[] = [
      ["clause", 2, 0],
      ["infer", [not(is("R", "y", ["2.0"]))], [[0, { "y'": "y" }]]],
      ["infer", [], [[0, {}]]],
    ];
    expect(reasonFor(evidenceOf(sentences, lines, made, { conclusion: null }))).toMatch(
      /line 2 does not follow/,
    );
    const captured: LineRecord[] = [
      lines[0]!,
      ["infer", [not(is("R", ["2.0"], ["2.0"]))], [[0, {}]]],
      lines[2]!,
    ];
    expect(reasonFor(evidenceOf(sentences, captured, made, { conclusion: null }))).toMatch(
      /line 1 does not follow/,
    );
  });

  it("miniscoping makes functions of fewer arguments", () => {
    // ∀x ∃y (R(x, x) ∨ R(y, y)) is ∀x R(x, x) ∨ ∃y R(y, y): y need not depend on x.
    const sentence = all("x", some("y", ["or", is("R", "x", "x"), is("R", "y", "y")]));
    const made: MadeFormula[] = [["miniscope", 0]];
    const lines = (constant: TermRecord): LineRecord[] => [
      ["clause", 2, 0],
      ["clause", 1, 0],
      [
        "infer",
        [],
        [
          [0, { x: constant }],
          [1, { x: constant }],
        ],
      ],
    ];
    const conclusion = some("x", is("R", "x", "x"));
    expect(reasonFor(evidenceOf([sentence, conclusion], lines(["2.0"]), made))).toBe("");
    expect(reasonFor(evidenceOf([sentence, conclusion], lines(["2.0", "x"]), made))).toMatch(/line 2/);
  });

  it("unfolding that doubles again and again ends", () => {
    const made: MadeFormula[] = [["define", "d0", ["x"], is("R", "x", "x")]];
    for (let i = 1; i < 60; i += 1)
      made.push(["define", `d${i}`, ["x"], ["and", is(`d${i - 1}`, "x"), is(`d${i - 1}`, "x")]]);
    for (let i = 1; i < 60; i += 1) made.push(["unfold", i === 1 ? 61 : 60 + i, 61 - i]);
    expect(reasonFor(evidenceOf([irreflexive, serial], contradiction(0), made))).toMatch(/too large/);
  });
});

describe("form", () => {
  const good = evidenceOf(
    [irreflexive, irreflexive],
    [
      ["clause", 0, 0],
      ["clause", 1, 0],
      [
        "infer",
        [],
        [
          [0, { x: ["1.0"] }],
          [1, {}],
        ],
      ],
    ],
  );
  const [fact] = good.facts as readonly [DerivationFact];

  it("is accepted as it should be", () => {
    expect(reasonFor(good)).toBe("");
  });

  it.each<[string, unknown]>([
    ["a foreign key", { ...fact, note: "" }],
    ["an unknown kind of line", { ...fact, lines: [["believe", []]] }],
    ["an unknown kind of made formula", { ...fact, made: [["assume", ["false"]]] }],
    ["a line that is no list", { ...fact, lines: ["clause"] }],
    ["a part too many", { ...fact, lines: [["clause", 0, 0, 0]] }],
    ["a number that is not whole", { ...fact, lines: [["clause", 0.5, 0]] }],
    ["a negative number", { ...fact, lines: [["clause", 0, -1]] }],
    ["a literal negated twice", { ...fact, lines: [["infer", [["not", ["not", is("R", "x", "x")]]], []]] }],
    [
      "a formula as literal",
      { ...fact, lines: [["infer", [["and", is("R", "x", "x"), is("R", "x", "x")]], []]] },
    ],
    ["truth as literal", { ...fact, lines: [["infer", [["true"]], []]] }],
    ["an atom without relation", { ...fact, lines: [["infer", [["is"]], []]] }],
    ["an identity of three", { ...fact, lines: [["infer", [["=", "x", "y", "z"]], []]] }],
    ["a number as term", { ...fact, lines: [["infer", [["is", "R", 1, 2]], []]] }],
    ["an empty list as term", { ...fact, lines: [["infer", [["is", "R", [], "x"]], []]] }],
    ["a substitution as list", { ...fact, lines: [["infer", [], [[0, ["x", "y"]]]]] }],
    ["a premise that is no sentence", { ...fact, premises: [2] }],
    ["a definition without body", { ...fact, made: [["define", "d", ["x"]]] }],
    ["a definition of a nameless relation", { ...fact, made: [["define", "", [], ["true"]]] }],
  ])("%s is refused", (_, changed) => {
    expect(checkEvidence({ ...good, facts: [changed] }).accepted).toBe(false);
  });

  it("terms in sentences are refused", () => {
    const sentence = is("R", ["0.0"], ["0.0"]);
    expect(reasonFor(evidenceOf([sentence, irreflexive], []))).toMatch(/not a name/);
  });

  it("deep terms are refused, and long derivations are not", () => {
    let deep: TermRecord = "x";
    for (let level = 0; level < 100_000; level += 1) deep = ["0.0", deep];
    expect(
      checkEvidence({ ...good, facts: [{ ...fact, lines: [["infer", [is("R", deep, deep)], []]] }] }),
    ).toMatchObject({
      accepted: false,
    });
    const long = Array.from({ length: 100_000 }, (): LineRecord => ["clause", 0, 0]);
    const lines: LineRecord[] = [
      ...long,
      ["clause", 1, 0],
      [
        "infer",
        [],
        [
          [0, { x: ["1.0"] }],
          [100_000, {}],
        ],
      ],
    ];
    expect(reasonFor(evidenceOf([irreflexive, irreflexive], lines))).toBe("");
  });

  it("the meter ends a check that is too dear", () => {
    const lines = Array.from(
      { length: 1000 },
      (): LineRecord => ["infer", [is("R", "x", "x"), not(is("R", "x", "x"))], []],
    );
    const result = checkEvidence(
      evidenceOf([irreflexive, irreflexive], [["clause", 0, 0], ...lines]),
      new Meter(1),
    );
    expect(result).toMatchObject({ accepted: false, reason: "the check ended early: budget" });
  });
});
