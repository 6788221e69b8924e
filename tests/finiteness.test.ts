/**
 * The search for reasons why there is no finite model: on what is known to have infinite models only, and on what has
 * finite ones. Every reason found is laid before the checker.
 */
import { describe, expect, it } from "vitest";
import { buildCarrier } from "../lib/carriers/build.ts";
import type { Structure } from "../lib/carriers/structure.ts";
import { Filter } from "../lib/inquiry/finiteness/filter.ts";
import { FinitenessSearch, type NoFiniteModel } from "../lib/inquiry/finiteness/search.ts";
import type { Formula } from "../lib/logic/formula.ts";
import { Meter, WorkEnded } from "../lib/logic/meter.ts";
import { signatureOf } from "../lib/logic/theory.ts";
import { findStructure } from "../lib/structures/search.ts";
import { readSentences } from "./support/corpora.ts";
import { expectAccepted, findReason, refutable, withoutFinite } from "./support/finiteness-sets.ts";

/** Friendship graphs that are not windmills are infinite by a theorem of their own (Erdős, Rényi & Sós 1966). */
const OUT_OF_REACH = ["cl-243"];

describe("infinite-only.json (literature, or devised with a reason): no finite model, derived", () => {
  it.each(withoutFinite.map(({ id, axioms }) => [id, axioms] as const))("%s", (_, axioms) => {
    const found = findReason(axioms, 60_000);
    expect(found).not.toBeNull();
    expectAccepted(axioms, found!);
  });
});

describe("premises and negated conclusion where there are only infinite countermodels: no finite model", () => {
  const sets = refutable("only infinite countermodels").filter(({ id }) => !OUT_OF_REACH.includes(id));
  it.each(sets.map(({ id, axioms }) => [id, axioms] as const))("%s", (_, axioms) => {
    const found = findReason(axioms, 30_000);
    expect(found).not.toBeNull();
    expectAccepted(axioms, found!);
  });
});

describe("premises and negated conclusion where there is a finite countermodel", () => {
  const sets = refutable("fails");
  it(`${sets.length} sets: nothing is found`, () => {
    expect(sets.length).toBeGreaterThan(70);
    for (const { id, axioms } of sets) expect([id, findReason(axioms, 1_500)]).toEqual([id, null]);
  });
});

const R = { name: "R", places: 2, infix: false };

function searchFor(axioms: readonly Formula[]): FinitenessSearch {
  return new FinitenessSearch(axioms, signatureOf(axioms, R));
}

/** Each principle, where what comes before it does not find a reason. */
const principles: Readonly<Record<string, readonly string[]>> = {
  "endless-order": [
    "forall x. ~R(x,x)",
    "forall x y z. R(x,y) & R(y,z) -> R(x,z)",
    "forall x. exists y. R(x,y)",
  ],
  counting: [
    "forall x y z. R(x,z) & R(y,z) -> x = y",
    "forall x. exists y. R(x,y)",
    "exists y. forall x. ~R(x,y)",
  ],
  // Each pair has a value, no three pairs share one, and there are three elements.
  pairs: [
    "forall x y. exists z. F(x,y,z)",
    "forall x y z u v w t. F(x,y,t) & F(z,u,t) & F(v,w,t) -> x = z & y = u | x = v & y = w | z = v & u = w",
    "exists x y z. x != y & y != z & x != z",
  ],
};

describe("the search", () => {
  it.each(Object.entries(principles))("finds a reason by %s", (principle, texts) => {
    const axioms = readSentences(texts);
    const found = findReason(axioms, 30_000);
    expect(found?.reason.record.principle).toBe(principle);
    expectAccepted(axioms, found!);
  });

  it("takes axioms for what they are: nothing is derived where all is said", () => {
    const found = findReason(readSentences(principles["endless-order"]!), 10);
    expect(found!.obligations.map(({ role, derived }) => [role, derived])).toEqual([
      ["it is irreflexive", null],
      ["it is transitive", null],
      ["every element has at least 1 successor", null],
    ]);
  });

  it("names what it asks for", () => {
    const dense = readSentences([
      "forall x. ~R(x,x)",
      "forall x y z. R(x,y) & R(y,z) -> R(x,z)",
      "forall x z. R(x,z) -> exists y. R(x,y) & R(y,z)",
      "exists x y. R(x,y)",
    ]);
    expect(findReason(dense, 10_000)!.obligations.map(({ role }) => role)).toEqual([
      "there is an element there",
      "it is irreflexive",
      "it is transitive",
      "every element there has at least 1 successor there",
    ]);
  });

  it("comes to the same however the steps are handed out", () => {
    for (const id of ["io-15", "io-47", "io-55", "io-71"]) {
      const { axioms } = withoutFinite.find((set) => set.id === id)!;
      const whole = searchFor(axioms);
      const expected = whole.advance(9, new Meter(100_000), null);
      const shared = searchFor(axioms);
      let found: NoFiniteModel | null = null;
      for (let budget = 90; found === null; budget += 7) {
        expect(budget).toBeLessThan(2_000);
        try {
          found = shared.advance(9, new Meter(budget), null);
        } catch (problem) {
          if (!(problem instanceof WorkEnded)) throw problem;
        }
      }
      expect(found).toEqual(expected);
      expect(shared.tried).toBe(whole.tried);
    }
  });

  it("stops when it is interrupted, and can go on", () => {
    const { axioms } = withoutFinite.find(({ id }) => id === "io-47")!;
    const search = searchFor(axioms);
    let polls = 0;
    const interrupted = new Meter(100_000, () => {
      polls += 1;
      return polls > 20;
    });
    expect(() => search.advance(9, interrupted, null)).toThrow(WorkEnded);
    expect(interrupted.ended).toBe("interrupted");
    expect(search.advance(9, new Meter(100_000), null)).toEqual(
      searchFor(axioms).advance(9, new Meter(100_000), null),
    );
  });

  it("goes level by level", () => {
    const { axioms } = withoutFinite.find(({ id }) => id === "io-51")!;
    const search = searchFor(axioms);
    expect(search.advance(0, new Meter(100_000), null)).toBeNull();
    const { tried } = search;
    expect(search.advance(0, new Meter(1), null)).toBeNull();
    expect(search.tried).toBe(tried);
    expect(search.advance(1, new Meter(100_000), null)).toBeNull();
    expect(search.advance(2, new Meter(100_000), null)).not.toBeNull();
  });

  it("has nothing to try where no axiom says that for all elements there are others", () => {
    const search = searchFor(
      readSentences(["exists x y. forall z. R(x,z) & ~R(z,y)", "forall x y. R(x,y) | R(y,x)"]),
    );
    expect(search.advance(9, new Meter(10), null)).toBeNull();
    expect(search.isExhausted).toBe(true);
    expect(search.tried).toBe(0);
  });

  it("says so when the axioms contradict each other, or derives what it asks for all the same", () => {
    const axioms = readSentences(["forall x. exists y. R(x,y)", "forall x y. ~R(x,y)"]);
    const found = findReason(axioms, 10_000)!;
    expect(found.obligations.some(({ derived }) => derived?.derivation.usesConclusion === false)).toBe(true);
  });
});

/** On the rational line. */
function modelOf(axioms: readonly Formula[]): Structure {
  const carrier = buildCarrier({ kind: "dense-line", colours: 1 });
  const { relations } = signatureOf(axioms, R);
  const outcome = findStructure({ carrier, sentences: axioms, relations }, new Meter());
  if (outcome.result !== "found") throw new Error(outcome.result);
  return outcome.structure;
}

describe("a model", () => {
  const dense = readSentences([
    "forall x y z. R(x,y) & R(y,z) -> R(x,z)",
    "forall x y. R(x,y) | R(y,x)",
    "forall x y. R(x,y) & R(y,x) -> x = y",
    "forall x. exists y z. R(x,y) & R(z,x) & x != y & x != z",
  ]);

  it("decides sentences before they are derived; what is too deep for it is left alone", () => {
    const model = modelOf(dense);
    const filter = new Filter();
    const sentences = readSentences([
      "forall x. exists y. R(x,y) & ~R(y,x)",
      "exists x. forall y. R(x,y)",
      "forall x y. R(x,y)",
      "exists a b c d e f g h i j. a != b & c != d & e != f & g != h & i != j & ~R(a,a)",
    ]);
    const meter = new Meter(1_000);
    expect(sentences.map((one) => filter.isFalse(model, one, meter))).toEqual([false, true, true, false]);
    expect(meter.steps).toBeLessThan(100);
  });

  it("spares derivations", () => {
    const { axioms } = withoutFinite.find(({ id }) => id === "io-75")!;
    const steps = [null, lineWithLast()].map((model) => {
      const meter = new Meter(100_000);
      const found = searchFor(axioms).advance(9, meter, model);
      expectAccepted(axioms, found!);
      return meter.steps;
    });
    expect(steps[1]!).toBeLessThan(steps[0]! / 2);

    /** The rational line and a last element. */
    function lineWithLast(): Structure {
      const carrier = buildCarrier({
        kind: "tuples",
        over: { kind: "dense-line", colours: 1 },
        widths: [1, 0],
      });
      const outcome = findStructure({ carrier, sentences: axioms, relations: [R] }, new Meter());
      if (outcome.result !== "found") throw new Error(outcome.result);
      return outcome.structure;
    }
  });
});
