/**
 * Textbook theorems of order and parthood, each with its source; the numbers and wordings of the sources are from memory,
 * the formulas are written out here in relations alone.
 */
import { describe, expect, it } from "vitest";
import { DerivationSearch } from "../lib/derivation/turns.ts";
import { checkEvidence } from "../lib/evidence/check.ts";
import { EvidenceWriter } from "../lib/inquiry/evidence-writer.ts";
import { Meter } from "../lib/logic/meter.ts";
import { Solver } from "../lib/structures/sat/solver.ts";
import { readSentences } from "./support/corpora.ts";

/** Davey & Priestley, Introduction to Lattices and Order, 2nd edition, 2002; from memory. */
const LATTICES = "Davey & Priestley 2002";
/** Simons, Parts: A Study in Ontology, 1987; from memory. */
const PARTS = "Simons 1987";
/** Casati & Varzi, Parts and Places, 1999; from memory. */
const PLACES = "Casati & Varzi 1999";

const order = [
  "forall x R(x,x)",
  "forall x y (R(x,y)&R(y,x) -> x=y)",
  "forall x y z (R(x,y)&R(y,z)->R(x,z))",
];
/** M(x,y,m): m is the greatest lower bound of x and y; J(x,y,j): j is the least upper bound. */
const meet = "forall x y m (M(x,y,m) <-> R(m,x) & R(m,y) & forall w (R(w,x)&R(w,y) -> R(w,m)))";
const join = "forall x y j (J(x,y,j) <-> R(x,j) & R(y,j) & forall w (R(x,w)&R(y,w) -> R(j,w)))";
const lattice = [...order, meet, join, "forall x y exists m M(x,y,m)", "forall x y exists j J(x,y,j)"];

const parthood = [
  "forall x P(x,x)",
  "forall x y (P(x,y)&P(y,x) -> x=y)",
  "forall x y z (P(x,y)&P(y,z)->P(x,z))",
];
const proper = "forall x y (Q(x,y) <-> P(x,y) & x!=y)";
const overlap = "forall x y (O(x,y) <-> exists z (P(z,x)&P(z,y)))";
/** What is not a part of something has a part that does not overlap it. */
const strong = "forall x y (~P(y,x) -> exists z (P(z,y) & ~O(z,x)))";
/** Beside a proper part there is another that does not overlap it. */
const weak = "forall x y (Q(x,y) -> exists z (P(z,y) & ~O(z,x)))";
const mereology = [...parthood, proper, overlap];

interface Theorem {
  readonly name: string;
  readonly source: string;
  readonly premises: readonly string[];
  readonly conclusion: string;
}

const theorems: readonly Theorem[] = [
  {
    name: "a greatest element is the only maximal one",
    source: `${LATTICES}, chapter 1`,
    premises: order,
    conclusion: "forall x (forall y R(y,x) -> forall z (forall y (R(z,y) -> y=z) -> z=x))",
  },
  {
    name: "in a chain what is maximal is greatest",
    source: `${LATTICES}, chapter 1`,
    premises: [...order, "forall x y (R(x,y) | R(y,x))"],
    conclusion: "forall x (forall y (R(x,y) -> y=x) -> forall y R(y,x))",
  },
  {
    name: "down-sets of elements are included in each other just as the elements are ordered",
    source: `${LATTICES}, lemma 1.30`,
    premises: order,
    conclusion: "forall x y (R(x,y) <-> forall z (R(z,x) -> R(z,y)))",
  },
  {
    name: "the strict part of an order is irreflexive and transitive",
    source: `${LATTICES}, chapter 1`,
    premises: [...order, "forall x y (S(x,y) <-> R(x,y) & x!=y)"],
    conclusion: "(forall x ~S(x,x)) & forall x y z (S(x,y)&S(y,z)->S(x,z))",
  },
  {
    name: "x ≤ y just if x ∧ y = x",
    source: `${LATTICES}, lemma 2.8, the connecting lemma`,
    premises: lattice,
    conclusion: "forall x y (R(x,y) <-> M(x,y,x))",
  },
  {
    name: "x ∧ y = x just if x ∨ y = y",
    source: `${LATTICES}, lemma 2.8`,
    premises: lattice,
    conclusion: "forall x y (M(x,y,x) <-> J(x,y,y))",
  },
  {
    name: "absorption: x ∧ (x ∨ y) = x",
    source: `${LATTICES}, theorem 2.9`,
    premises: lattice,
    conclusion: "forall x y j (J(x,y,j) -> M(x,j,x))",
  },
  {
    name: "meets are commutative",
    source: `${LATTICES}, theorem 2.9`,
    premises: lattice,
    conclusion: "forall x y m (M(x,y,m) -> M(y,x,m))",
  },
  {
    name: "meets are associative",
    source: `${LATTICES}, theorem 2.9`,
    premises: [...order, meet],
    conclusion: "forall x y z a b c d (M(x,y,a) & M(a,z,b) & M(y,z,c) & M(x,c,d) -> b=d)",
  },
  {
    name: "meets are monotone",
    source: `${LATTICES}, 2.5`,
    premises: [...order, meet],
    conclusion: "forall x y z a b (R(x,y) & M(x,z,a) & M(y,z,b) -> R(a,b))",
  },
  {
    name: "a meet of joins is above the join of the meets",
    source: `${LATTICES}, lemma 4.1`,
    premises: lattice,
    conclusion: "forall x y z a b c d e (M(x,y,a) & M(x,z,b) & J(a,b,c) & J(y,z,d) & M(x,d,e) -> R(c,e))",
  },
  {
    name: "a dense order has no covers",
    source: `${LATTICES}, chapter 1`,
    premises: [
      ...order,
      "forall x y (S(x,y) <-> R(x,y) & x!=y)",
      "forall x y (S(x,y) -> exists z (S(x,z)&S(z,y)))",
      "forall x y (C(x,y) <-> S(x,y) & ~exists z (S(x,z)&S(z,y)))",
    ],
    conclusion: "forall x y ~C(x,y)",
  },
  {
    name: "proper parthood is asymmetric",
    source: `${PARTS}, chapter 1`,
    premises: [...parthood, proper],
    conclusion: "forall x y (Q(x,y) -> ~Q(y,x))",
  },
  {
    name: "a part of a proper part is a proper part",
    source: `${PARTS}, chapter 1`,
    premises: [...parthood, proper],
    conclusion: "forall x y z (P(x,y) & Q(y,z) -> Q(x,z))",
  },
  {
    name: "nothing has a single proper part, by weak supplementation",
    source: `${PARTS}, chapter 1`,
    premises: [...mereology, weak],
    conclusion: "forall x y (Q(x,y) -> exists z (Q(z,y) & z!=x))",
  },
  {
    name: "strong supplementation gives weak supplementation",
    source: `${PARTS}, chapter 1; ${PLACES}, chapter 3`,
    premises: [...mereology, strong],
    conclusion: weak,
  },
  {
    name: "strong supplementation gives the proper parts principle",
    source: `${PARTS}, chapter 1`,
    premises: [...mereology, strong],
    conclusion: "forall x y (exists z Q(z,x) & forall z (Q(z,x) -> Q(z,y)) -> P(x,y))",
  },
  {
    name: "what overlaps the same is the same, by strong supplementation",
    source: `${PLACES}, chapter 3`,
    premises: [...mereology, strong],
    conclusion: "forall x y (forall z (O(z,x) <-> O(z,y)) -> x=y)",
  },
  {
    name: "overlap is monotone in parthood",
    source: `${PLACES}, chapter 3`,
    premises: [...parthood, overlap],
    conclusion: "forall x y (P(x,y) -> forall z (O(z,x) -> O(z,y)))",
  },
  {
    name: "what overlaps is connected, when connection is monotone in parthood",
    source: `${PLACES}, chapter 4`,
    premises: [
      ...parthood,
      overlap,
      "forall x C(x,x)",
      "forall x y (C(x,y) -> C(y,x))",
      "forall x y (P(x,y) -> forall z (C(z,x) -> C(z,y)))",
    ],
    conclusion: "forall x y (O(x,y) -> C(x,y))",
  },
  {
    name: "a tangential part is no interior part",
    source: `${PLACES}, chapter 4`,
    premises: [
      "forall x y (E(x,y) <-> C(x,y) & ~O(x,y))",
      "forall x y (T(x,y) <-> P(x,y) & exists z (E(z,x) & E(z,y)))",
      "forall x y (I(x,y) <-> P(x,y) & ~T(x,y))",
    ],
    conclusion: "forall x y (I(x,y) -> forall z (E(z,x) & C(z,y) -> O(z,y)))",
  },
];

/** Generated clauses within which each is to be derived. */
const MOST_CLAUSES = 20_000;

describe("textbook theorems", () => {
  it.each(theorems)("$name ($source)", ({ premises, conclusion }) => {
    const sentences = readSentences([...premises, conclusion]);
    const task = { premises: sentences.slice(0, -1), conclusion: sentences.at(-1)! };
    const search = new DerivationSearch(task, (onDerived) => new Solver({ observer: { onDerived } }));
    const meter = new Meter(MOST_CLAUSES);
    let outcome = search.next(meter);
    while (outcome.result === "gave-up") outcome = search.next(meter);
    if (outcome.result !== "derived") throw new Error(outcome.result);
    const writer = new EvidenceWriter();
    const question = {
      ask: "entails" as const,
      premises: writer.theory(task.premises),
      conclusion: writer.sentence(task.conclusion),
    };
    writer.addDerivation(task, outcome.derivation);
    expect(checkEvidence(writer.finish(question, "holds"))).toMatchObject({ accepted: true });
    expect(outcome.derivation.usesConclusion).toBe(true);
  });
});
