/**
 * What first-order logic cannot say of a relation, though it has a name: asked for, it is refused with the reason
 * and with what is usually said in its stead. All of it is by compactness (Gödel 1930; Ebbinghaus, Flum and Thomas
 * 1994, chapter VI) or by the theorems of Löwenheim and Skolem.
 */
import { equal, type Formula, forall, not, or } from "../logic/formula.ts";
import { type RelationTerm, termFormula, withinSteps } from "../logic/terms.ts";

export interface Inexpressible {
  readonly word: string;
  /** Why no sentence says it; begins small and ends without a stop. */
  readonly reason: string;
  /** What to write instead. */
  readonly instead: string;
  /** What `up to n` makes of it; null where it makes nothing. */
  readonly approximate: ((term: RelationTerm, steps: number) => Formula) | null;
}

const LONGER_PATHS =
  "by compactness, a sentence that is true of paths of every length is also true where no path joins two elements";
const LONGER_CHAINS =
  "by compactness, a sentence that allows descending chains of every finite length also allows infinite ones";
const SIZES = "by compactness, a sentence with finite models of every size also has infinite ones";
const SKOLEM =
  "by the theorems of Löwenheim and Skolem a sentence with an infinite model has models of every infinite size";

const CLOSURE = {
  reason: LONGER_PATHS,
  instead: "write so many steps as are meant, `R ∪ R ∘ R ∪ R ∘ R ∘ R`",
  approximate: null,
};
const FOUNDED = {
  reason: LONGER_CHAINS,
  instead: "on finite domains it says as much as `acyclic`: write `acyclic up to 5`",
  approximate: null,
};
const COUNTED = {
  reason: SKOLEM,
  instead: "ask `check-finite T` whether T has finite models",
  approximate: null,
};

export const inexpressibles: readonly Inexpressible[] = [
  {
    word: "acyclic",
    reason:
      "by compactness, a sentence that is true whenever there is no cycle is also true of some long cycle",
    instead: "write `acyclic up to 5`: no cycle of at most 5 steps",
    approximate: (term, steps) => forall("x", not(termFormula(withinSteps(term, steps), "x", "x"))),
  },
  {
    word: "connected",
    reason: LONGER_PATHS,
    instead:
      "write `connected up to 5`: any two points are joined by at most 5 steps, in either direction; where every two different elements are related, `semi-connex`",
    approximate: (term, steps) =>
      joined({ kind: "union", left: term, right: { kind: "converse", of: term } }, steps),
  },
  {
    word: "strongly-connected",
    reason: LONGER_PATHS,
    instead: "write `strongly-connected up to 5`: from any point to any other lead at most 5 steps",
    approximate: joined,
  },
  { word: "reachable", ...CLOSURE },
  { word: "transitive-closure", ...CLOSURE },
  { word: "reflexive-transitive-closure", ...CLOSURE },
  { word: "well-founded", ...FOUNDED },
  { word: "conversely-well-founded", ...FOUNDED },
  { word: "noetherian", ...FOUNDED },
  {
    word: "well-order",
    reason: LONGER_CHAINS,
    instead: "on finite domains it says as much as `strict-linear-order`",
    approximate: null,
  },
  {
    word: "finite",
    reason: SIZES,
    instead: "write `at-most 5 points`, or ask `check-finite T` whether T has finite models",
    approximate: null,
  },
  {
    word: "infinite",
    reason: `no finite theory says it and nothing more: ${SIZES}`,
    instead:
      "write `at-least 5 points`; a strict order without a last element, `strict-order ∧ right-serial`, has only infinite models",
    approximate: null,
  },
  { word: "countable", ...COUNTED },
  { word: "uncountable", ...COUNTED },
  {
    word: "dedekind-complete",
    reason:
      "it is about all sets of elements, and by the theorems of Löwenheim and Skolem a sentence true of the real line is true of a countable order",
    instead: "say it of the sets that a formula defines, one axiom for each formula",
    approximate: null,
  },
];

/** From any point to any other, or to itself, lead at most so many steps. */
function joined(term: RelationTerm, steps: number): Formula {
  return forall(["x", "y"], or(equal("x", "y"), termFormula(withinSteps(term, steps), "x", "y")));
}

const byWord = new Map(inexpressibles.map((one) => [one.word, one]));

/** The entry for a word; undefined for other words. */
export function findInexpressible(word: string): Inexpressible | undefined {
  return byWord.get(word);
}

/** Names with more than one meaning in the trade, and what each is called here. */
export const ambiguousProperties: ReadonlyMap<string, string> = new Map([
  [
    "total",
    "`right-serial` (every element is related to some) or `connex` (of two elements, one is related to the other)",
  ],
  ["complete", "`connex`, or `semi-connex` where an element need not be related to itself"],
  ["weak-order", "`strict-weak-order` or `total-preorder`"],
  ["directed", "`up-directed` (any two elements) or `confluent` (any two that one element is related to)"],
  ["weakly-connected", "`non-branching-right`, or of a graph `connected up to n`"],
  ["euclidian", "`right-euclidean` or `left-euclidean`"],
  ["order", "`partial-order`, `strict-order` or `linear-order`"],
  ["intransitive", "`antitransitive`, or `¬transitive`"],
  ["nontransitive", "`¬transitive`"],
  ["cyclic", "`circular`, or `¬(acyclic up to n)`"],
  ["convergent", "`confluent` or `up-directed`"],
  ["linear", "`linear-order`, `strict-linear-order`, `connex` or `semi-connex`"],
]);
