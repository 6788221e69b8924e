/**
 * Free terms: structures and certificates are found for axioms that no carrier has a model of, and what is accepted is true.
 * Truth is judged on ground terms by definition (`support/ground-terms.ts`), which shares nothing with the checker.
 */
import fc from "fast-check";
import { describe, expect, it } from "vitest";
import {
  type CertificateRecord,
  readCertificate,
  readTerms,
  type TermsRecord,
} from "../lib/carriers/free-terms.ts";
import { checkCertificate } from "../lib/carriers/free-terms-check.ts";
import type { RelationSymbol } from "../lib/logic/formula.ts";
import { Meter, WorkEnded } from "../lib/logic/meter.ts";
import {
  type FormulaRecord,
  recordFormula,
  type TermFormulaRecord,
  type TermRecord,
} from "../lib/logic/records/formulas.ts";
import { describeTerms } from "../lib/structures/free-terms/describe.ts";
import { certify, findFreeTerms } from "../lib/structures/free-terms/find.ts";
import { changes, wordsIn } from "./support/changes.ts";
import { readSentences } from "./support/corpora.ts";
import {
  agreesAtGroundTerms,
  agreesWithParameters,
  certifiesOneSide,
  readsWhatIsWritten,
  seed,
} from "./support/free-terms-properties.ts";
import { type Ground, GroundTerms, groundTerms, isSentence, passes } from "./support/ground-terms.ts";
import { dualOf, FORMS, wantedBy } from "./support/wanted-models.ts";

const R: RelationSymbol = { name: "R", places: 2, infix: false };
const P: RelationSymbol = { name: "P", places: 1, infix: false };
const options = (numRuns: number) => ({ seed, numRuns, verbose: 1 as const });
const meter = () => new Meter(1e6);
const read = (text: string) => recordFormula(readSentences([text])[0]!);

/** Empty set and adjunction: f(x, y) is x with the member y. */
const adjunction: TermsRecord = {
  constructors: { c: [], f: ["x", "y"] },
  relations: {
    R: { on: 1, others: ["w"], cases: { c: ["false"], f: ["or", ["is", "R", "w", "x"], ["=", "w", "y"]] } },
  },
};
/** The natural numbers c, f(c), f(f(c)), … with <. */
const numbers: TermsRecord = {
  constructors: { c: [], f: ["x"] },
  relations: {
    R: { on: 1, others: ["w"], cases: { c: ["false"], f: ["or", ["is", "R", "w", "x"], ["=", "w", "x"]] } },
  },
};
/** The graph of a constructor: F(a, b, z) says that z is f(a, b). */
const graph: TermsRecord = {
  constructors: { c: [], d: [], f: ["x", "y"] },
  relations: {
    F: {
      on: 2,
      others: ["w1", "w2"],
      cases: { c: ["false"], d: ["false"], f: ["and", ["=", "w1", "x"], ["=", "w2", "y"]] },
    },
  },
};

function isCertified(record: TermsRecord, sentence: FormulaRecord, steps = 500): boolean {
  try {
    return certify(record, [sentence], new Meter(steps)) !== null;
  } catch (problem) {
    if (problem instanceof WorkEnded) return false;
    throw problem;
  }
}

// infinite-only.json, claims.json and questions.json, each entry with its source: empty set and adjunction (Bernays 1937;
// Tarski, Mostowski and Robinson 1953, p. 34), pairing, singletons without pairs.
describe("axioms of which no carrier has a model", () => {
  const ids = ["io-47", "io-49", "io-53", "cl-235", "cl-273", "q-h281"];
  it.each(ids.flatMap((id) => FORMS.map((form) => [id, form] as const)))("%s, %s", (id, form) => {
    const sentences = dualOf(wantedBy(id), form);
    const work = new Meter();
    const found = findFreeTerms(sentences, [R], work)!;
    expect(found).not.toBeNull();
    expect(work.steps).toBeLessThan(1_000);
    expect(readTerms(JSON.parse(JSON.stringify(found.record)))).toEqual(found.record);
    sentences.forEach((formula, place) => {
      const sentence = recordFormula(formula);
      const certificate = readCertificate(found.certificates[place], found.record)!;
      expect(checkCertificate(found.record, sentence, certificate, meter())).toBe(true);
      expect(passes(found.record, sentence, certificate)).toBe(true);
      expect(isCertified(found.record, ["not", sentence], 50)).toBe(false);
    });
    expect(findFreeTerms(sentences, [R], new Meter())).toEqual(found);
  });

  it("interprets relations that the sentences do not speak of", () => {
    const found = findFreeTerms(wantedBy("io-47"), [R, P], meter())!;
    expect(Object.keys(found.record.relations)).toEqual(["R", "P"]);
  });

  it("finds none where there is none, or no reason for one", () => {
    for (const text of ["exists x. R(x,x) & ~R(x,x)", "forall x. R(x,x)"])
      expect(findFreeTerms(readSentences([text]), [R], meter())).toBeNull();
    // Unrestricted comprehension (Russell's paradox).
    const russell = "forall x. exists z. forall w. R(w,z) <-> ~R(w,w)";
    expect(findFreeTerms(readSentences([russell]), [R], meter())).toBeNull();
  });

  it("tells a structure in parts", () => {
    const { constructors, clauses } = describeTerms(adjunction);
    expect(constructors).toEqual([["c"], ["f", "x", "y"]]);
    expect(clauses).toEqual([
      { head: ["is", "R", "w", ["c"]], body: ["false"] },
      { head: ["is", "R", "w", ["f", "x", "y"]], body: ["or", ["is", "R", "w", "x"], ["=", "w", "y"]] },
    ]);
  });
});

describe("what is known of these structures", () => {
  // Consequences of empty set and adjunction, and what holds where nothing is identified; common practice.
  it.each([
    "forall x. exists z. forall w. R(w,z) <-> w = x",
    "forall x y. exists z. forall w. R(w,z) <-> w = x | w = y",
    "forall x. ~R(x,x)",
    "~exists x y. R(x,y) & R(y,x)",
    "~exists x y z. R(x,y) & R(y,z) & R(z,x)",
    "~exists z. forall w. R(w,z)",
    "exists x y. x != y & (forall z. R(z,x) <-> R(z,y))",
  ])("adjunction: %s", (text) => {
    expect(isCertified(adjunction, read(text))).toBe(true);
    expect(isCertified(adjunction, ["not", read(text)])).toBe(false);
  });

  it("adjunction: sets of three", () => {
    const three = read("forall x y u. exists z. forall w. R(w,z) <-> w = x | w = y | w = u");
    const set: TermRecord = ["f", ["f", ["f", ["c"], "1"], "2"], "3"];
    expect(checkCertificate(adjunction, three, [["instances", set]], meter())).toBe(true);
    for (const wrong of [set[1], "1", ["f", ["f", set[1], "2"], "2"]] as TermRecord[])
      expect(checkCertificate(adjunction, three, [["instances", wrong]], meter())).toBe(false);
  });

  it("adjunction: unions, by induction with a witness from the hypothesis", () => {
    const union = read("forall x y. exists z. forall w. R(w,z) <-> R(w,x) | R(w,y)");
    const branch: CertificateRecord = [["instances", ["f", "5", "4"]], ["instances", "7"], ["instances"]];
    const certificate: CertificateRecord = [["induction", "2", { c: [["instances", "1"]], f: branch }]];
    expect(checkCertificate(adjunction, union, certificate, meter())).toBe(true);
    // Without the hypothesis the witness comes from nowhere.
    const cases: CertificateRecord = [["cases", "2", { c: [["instances", "1"]], f: branch }]];
    expect(checkCertificate(adjunction, union, cases, meter())).toBe(false);
    expect(checkCertificate(adjunction, ["not", union], certificate, meter())).toBe(false);
  });

  // The coding of finite sets by numbers of Ackermann (1937; from memory): m is a member of n if bit m of n is 1.
  it("adjunction agrees with Ackermann's coding, up to codes of the same set", () => {
    const codeOf = ([symbol, set, member]: Ground): bigint =>
      symbol === "c" ? 0n : codeOf(set!) | (1n << codeOf(member!));
    const terms = groundTerms(adjunction, 60).filter((term) => codeOf(term) < 1n << 12n);
    expect(terms.length).toBeGreaterThan(25);
    const structure = new GroundTerms(adjunction);
    for (const set of terms) {
      const members = terms.filter((term) => structure.holds("R", [term, set]));
      for (const member of members) expect((codeOf(set) >> codeOf(member)) & 1n).toBe(1n);
      const codes = new Set(members.map(codeOf));
      expect(codes.size).toBe([...codeOf(set).toString(2)].filter((bit) => bit === "1").length);
    }
  });

  // The axioms of locally free algebras (Mal'cev 1961; from memory), for one constructor of two arguments and two constants.
  it.each([
    "forall x y. exists z. F(x,y,z)",
    "forall x y u v. F(x,y,u) & F(x,y,v) -> u = v",
    "forall x y u v z. F(x,y,z) & F(u,v,z) -> x = u & y = v",
    "~exists x y. F(x,y,x) | F(x,y,y)",
    "~exists x y z u. F(x,y,z) & (F(z,u,x) | F(u,z,x) | F(z,u,y) | F(u,z,y))",
    "exists x y. x != y & (forall z. (forall u v. ~F(u,v,z)) <-> z = x | z = y)",
  ])("locally free algebras: %s", (text) => {
    const sentence = recordFormula(readSentences([text])[0]!);
    expect(isCertified(graph, sentence, 2_000)).toBe(true);
    expect(isCertified(graph, ["not", sentence], 100)).toBe(false);
  });

  // A linear order with a first element, without a last one, in which what has something below it has a predecessor.
  it.each([
    "forall x y z. R(x,y) & R(y,z) -> R(x,z)",
    "forall x. ~R(x,x)",
    "forall x. exists y. R(x,y)",
    "exists x. forall y. ~R(y,x)",
    "forall x y. R(x,y) -> (exists z. R(z,y) & (forall u. R(u,y) -> u = z | R(u,z)))",
  ])("numbers: %s", (text) => {
    expect(isCertified(numbers, read(text))).toBe(true);
    expect(isCertified(numbers, ["not", read(text)], 100)).toBe(false);
  });
});

describe(`random structures (seed ${seed})`, () => {
  it("are read as they are written", () => readsWhatIsWritten(100));
  it("unfolding at ground terms agrees with their definition", () => agreesAtGroundTerms(600));
  it("unfolding with parameters agrees with all ground terms", () => agreesWithParameters(1_200));
  it("no sentence is certified with its negation, and certified ones are true as far as can be seen", () =>
    certifiesOneSide(80));
});

describe("relations that go down", () => {
  const one = (others: readonly string[], cases: Readonly<Record<string, TermFormulaRecord>>) => ({
    on: others.length,
    others,
    cases: { c: ["false"], ...cases } as const,
  });
  const isRefuted = (record: TermsRecord, ...literals: readonly TermFormulaRecord[]) => {
    expect(readTerms(record)).toBe(record);
    const body: TermFormulaRecord = literals.length === 1 ? literals[0]! : ["and", ...literals];
    const sentence: FormulaRecord = ["forall", "x", ["forall", "y", ["not", body]]];
    return checkCertificate(record, sentence, [], meter());
  };

  it("go down at some places and not at others", () => {
    const record: TermsRecord = {
      constructors: { c: [], f: ["x"] },
      relations: { G: one(["w1", "w2"], { f: ["=", "w1", "x"] }) },
    };
    expect(isRefuted(record, ["is", "G", "x", "y", "x"])).toBe(true);
    expect(isRefuted(record, ["is", "G", "x", "y", "y"])).toBe(false);
  });

  it("go down where they hold, where they fail, or neither", () => {
    const down: TermFormulaRecord = ["or", ["=", "w", "x"], ["is", "R", "w", "x"]];
    const up: TermFormulaRecord = ["and", ["not", ["=", "w", "x"]], ["is", "R", "w", "x"]];
    const holds: TermsRecord = {
      constructors: { c: [], f: ["x"] },
      relations: { R: one(["w"], { f: down }) },
    };
    const both: TermsRecord = { ...holds, relations: { R: one(["w"], { c: ["true"], f: up }) } };
    const loop: TermFormulaRecord = ["is", "R", "x", "x"];
    expect(isRefuted(holds, loop)).toBe(true);
    expect(isRefuted(holds, ["not", loop])).toBe(false);
    expect(isRefuted(both, ["not", loop])).toBe(true);
    expect(isRefuted(both, loop)).toBe(false);
    // At c, everything fails to be related.
    const neither: TermsRecord = { ...holds, relations: { R: one(["w"], { f: up }) } };
    expect(isRefuted(neither, ["not", loop])).toBe(false);
  });

  it("circles have one direction", () => {
    const path = [["is", "R", "x", "y"]] as const;
    expect(isRefuted(adjunction, ...path, ["is", "R", "y", "x"])).toBe(true);
    expect(isRefuted(adjunction, ...path, ["=", "x", "y"])).toBe(true);
    expect(isRefuted(adjunction, ...path, ["not", ["is", "R", "y", "x"]])).toBe(false);
    expect(isRefuted(adjunction, ...path)).toBe(false);
  });

  it("that one goes down never rests on another that does not", () => {
    // If R went down, Q would, by R(x, x); but R holds of all and any g(x). Both hold of f(g(g(c))) and itself.
    const [r, q]: TermFormulaRecord[] = [
      ["is", "R", "x", "x"],
      ["is", "Q", "x", "x"],
    ];
    const record: TermsRecord = {
      constructors: { c: [], f: ["x"], g: ["x"] },
      relations: { R: one(["w"], { f: q!, g: ["true"] }), Q: one(["w"], { f: r!, g: r! }) },
    };
    const term: Ground = ["f", ["g", ["g", ["c"]]]];
    const both: TermFormulaRecord = ["and", r!, q!];
    expect(new GroundTerms(record).isTrue(both, { every: [], some: [] }, { x: term })).toBe(true);
    expect(isRefuted(record, r!, q!)).toBe(false);
  });
});

describe("hostile records and certificates", () => {
  const samples = ["io-47", "io-53", "q-h281"].flatMap((id) => {
    const found = findFreeTerms(wantedBy(id), [R], meter())!;
    return wantedBy(id).map((formula, place) => ({
      record: found.record,
      sentence: recordFormula(formula),
      certificate: found.certificates[place]!,
    }));
  });
  const transitive = read("forall x y z. R(x,y) & R(y,z) -> R(x,z)");
  samples.push({
    record: numbers,
    sentence: transitive,
    certificate: certify(numbers, [transitive], meter())![0]!,
  });

  it.each(samples.map((sample) => [JSON.stringify(sample.sentence), sample] as const))(
    "whatever is changed for %s, what is accepted is true",
    (_, sample) => {
      const words = [...wordsIn(sample), "1", "2", "3", "4", "induction", "cases", "exists", "true", ["c"]];
      let [accepted, refused] = [0, 0];
      for (const changed of changes(sample, () => words)) {
        const { record, sentence, certificate } = changed as Record<string, unknown>;
        const terms = readTerms(record);
        const steps = terms === null ? null : readCertificate(certificate, terms);
        if (
          terms === null ||
          steps === null ||
          !isSentence(sentence) ||
          !checkCertificate(terms, sentence, steps, meter())
        ) {
          refused += 1;
          continue;
        }
        accepted += 1;
        expect(passes(terms, sentence, steps), JSON.stringify(changed)).toBe(true);
      }
      expect(refused).toBeGreaterThan(accepted);
      expect(accepted).toBeGreaterThan(0);
    },
  );

  it("any value is read or refused", () => {
    fc.assert(
      fc.property(fc.jsonValue({ maxDepth: 6 }), (value) => {
        expect(readTerms(value)).toBeNull();
        readCertificate(value, adjunction);
      }),
      options(500),
    );
  });

  const withCase = (body: unknown, others: unknown = ["w"], on: unknown = 1) => ({
    constructors: { c: [], f: ["x", "y"] },
    relations: { R: { on, others, cases: { c: ["false"], f: body } } },
  });
  it.each([
    ["no constant", { ...adjunction, constructors: { f: ["x", "y"] } }],
    ["only constants", { constructors: { c: [] }, relations: {} }],
    ["a relation of larger terms", withCase(["is", "R", "x", "w"])],
    ["a relation of the same term", withCase(["is", "R", "w", ["f", "x", "y"]])],
    ["a relation of other terms", withCase(["is", "R", "x", ["c"]])],
    ["a relation of too few places", withCase(["is", "R", "x"])],
    ["an unknown relation", withCase(["is", "S", "w", "x"])],
    ["a foreign variable", withCase(["=", "w", "z"])],
    ["a foreign constructor", withCase(["=", "w", ["g"]])],
    ["a constructor with too few arguments", withCase(["=", "w", ["f", "x"]])],
    ["a quantifier", withCase(["forall", "v", ["=", "w", "v"]])],
    ["a variable that is also an argument", withCase(["=", "x", "y"], ["x"])],
    ["no such place", withCase(["true"], ["w"], 2)],
    ["a connective of no kind", withCase(["toString", ["true"]])],
    ["an inherited relation", withCase(["is", "toString", "w", "x"])],
    ["deep nesting", withCase(nested(100_000))],
  ])("%s is refused", (_, value) => expect(readTerms(value)).toBeNull());

  it("deep or endless certificates are refused", () => {
    let steps: unknown = [];
    for (let depth = 0; depth < 100_000; depth += 1) steps = [["cases", "1", { c: [], f: steps }]];
    expect(readCertificate(steps, adjunction)).toBeNull();
    let term: unknown = ["c"];
    for (let depth = 0; depth < 100_000; depth += 1) term = ["f", term, ["c"]];
    expect(readCertificate([["instances", term]], adjunction)).toBeNull();
  });

  it("parameters are those that have come", () => {
    const sentence = read("exists x. forall y. ~R(y,x)");
    const check = (steps: CertificateRecord) => checkCertificate(adjunction, sentence, steps, meter());
    expect(check([["instances", ["c"]]])).toBe(true);
    // Here "1" would be the element that is to be no member of it.
    for (const name of ["1", "01", "1.0", " 1", "y", "0", "-1", "Infinity"]) {
      expect(check([["instances", name]])).toBe(false);
      expect(check([["cases", name, { c: [["instances", ["c"]]], f: [["instances", ["c"]]] }]])).toBe(false);
    }
  });

  it("variables that are called as parameters are other things", () => {
    const sentence: FormulaRecord = ["exists", "2", ["forall", "1", ["not", ["is", "R", "1", "2"]]]];
    expect(checkCertificate(adjunction, sentence, [["instances", ["c"]]], meter())).toBe(true);
    const wrong: FormulaRecord = ["forall", "1", ["exists", "2", ["is", "R", "2", "1"]]];
    expect(checkCertificate(adjunction, wrong, [["instances", "1"]], meter())).toBe(false);
  });

  it("sentences about other relations, or other numbers of places, are refused", () => {
    for (const sentence of [
      ["forall", "x", ["or", ["is", "S", "x"], ["not", ["is", "S", "x"]]]],
      ["forall", "x", ["or", ["is", "R", "x"], ["not", ["is", "R", "x"]]]],
      ["or", ["is", "R", "x", "x"], ["not", ["is", "R", "x", "x"]]],
    ] as FormulaRecord[])
      expect(checkCertificate(adjunction, sentence, [], meter())).toBe(false);
  });

  it("what grows beyond bounds is refused, and the meter bounds the check", () => {
    let body: TermFormulaRecord = ["is", "R", "x", "x"];
    for (let depth = 0; depth < 40; depth += 1) body = ["iff", body, body];
    expect(checkCertificate(adjunction, ["forall", "x", body], [], meter())).toBe(false);
    const sentence = read("forall x y. exists z. forall w. R(w,z) <-> R(w,x) | w = y");
    const certificate: CertificateRecord = [["instances", ["f", "1", "2"]]];
    expect(() => checkCertificate(adjunction, sentence, certificate, new Meter(0))).toThrow(WorkEnded);
  });

  function nested(levels: number): unknown {
    let body: unknown = ["true"];
    for (let level = 0; level < levels; level += 1) body = ["not", body];
    return body;
  }
});
