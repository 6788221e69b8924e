/** Reasons why there is no finite model, made by hand: each principle and its variants, all obligations taken for axioms. */
import type { ShownReason } from "../../lib/inquiry/answer.ts";
import {
  obligationsFor,
  type PrincipleShape,
  type ReasonParts,
  reasonOf,
} from "../../lib/inquiry/finiteness/reason.ts";
import { and, atom, equal, exists, not, or, type RelationSymbol, verum } from "../../lib/logic/formula.ts";
import { R } from "./display-fixtures.ts";

export const less: RelationSymbol = { name: "<", places: 2, infix: true };
const between: RelationSymbol = { name: "B", places: 3, infix: false };

const xy = atom(R, "x", "y");
const strict = and(xy, not(atom(R, "y", "x")));
const everywhere = { domain: verum, witness: null };
const identity = { different: "identity" } as const;
const signature = { different: [["R", 2]] as const };

function counting(
  successors: number,
  predecessors: number,
  spare: "fewer-predecessors" | "more-successors" | null,
  by: typeof identity | typeof signature = identity,
  everywhere = false,
): PrincipleShape {
  return { principle: "counting", successors, predecessors, spare, everywhere, ...by };
}

/** Each with its name. */
export const reasonParts: Readonly<Record<string, readonly [PrincipleShape, ReasonParts]>> = {
  "an endless order": [
    { principle: "endless-order", everywhere: false },
    { ...everywhere, relation: strict },
  ],
  "an endless order by an infix relation": [
    { principle: "endless-order", everywhere: false },
    { ...everywhere, relation: atom(less, "x", "y") },
  ],
  "an endless order on a part": [
    { principle: "endless-order", everywhere: false },
    { domain: exists("y", atom(R, "y", "x")), relation: xy, witness: null },
  ],
  "an endless order above an element": [
    { principle: "endless-order", everywhere: false },
    {
      domain: atom(R, "k", "x"),
      relation: strict,
      witness: { parameters: ["k"], given: exists("x", atom(R, "k", "x")) },
    },
  ],
  "a map that is one to one and not onto": [
    counting(1, 1, "fewer-predecessors"),
    { ...everywhere, relation: xy },
  ],
  "a map that is one to one and not onto, on a part": [
    counting(1, 1, "fewer-predecessors"),
    { domain: not(atom(R, "x", "x")), relation: xy, witness: null },
  ],
  "a map that is onto and not one to one": [
    counting(1, 1, "more-successors"),
    { ...everywhere, relation: atom(R, "y", "x") },
  ],
  "an order that is endless on a part": [
    { principle: "endless-order", everywhere: true },
    {
      domain: not(equal("x", "k")),
      relation: xy,
      witness: { parameters: ["k"], given: verum },
    },
  ],
  "a map that is one to one everywhere": [
    counting(1, 1, "fewer-predecessors", identity, true),
    { domain: not(atom(R, "x", "x")), relation: xy, witness: null },
  ],
  "two successors": [counting(2, 1, null), { ...everywhere, relation: xy }],
  "three successors on a part": [
    counting(3, 2, null),
    { domain: not(atom(R, "x", "x")), relation: xy, witness: null },
  ],
  "two and two, one with fewer": [counting(2, 2, "fewer-predecessors"), { ...everywhere, relation: xy }],
  "two and two, one with more": [counting(2, 2, "more-successors"), { ...everywhere, relation: xy }],
  "without identity": [counting(1, 1, "fewer-predecessors", signature), { ...everywhere, relation: strict }],
  pairs: [
    { principle: "pairs", pairs: 1, ...identity },
    { ...everywhere, relation: atom(between, "x", "y", "z") },
  ],
  "unordered pairs with two elements": [
    { principle: "pairs", pairs: 2, ...identity },
    {
      domain: not(atom(R, "x", "u")),
      relation: and(atom(R, "x", "z"), or(atom(R, "y", "z"), equal("x", "y"))),
      witness: { parameters: ["u", "v"], given: not(equal("u", "v")) },
    },
  ],
  comprehension: [
    { principle: "comprehension", ...signature },
    { ...everywhere, relation: xy },
  ],
  "comprehension on a part": [
    { principle: "comprehension", ...identity },
    { domain: not(atom(R, "x", "x")), relation: atom(R, "y", "x"), witness: null },
  ],
};

/** The reason of that name, its obligations without derivations. */
export function reasonNamed(name: string): ShownReason {
  const [shape, parts] = reasonParts[name]!;
  const reason = reasonOf(shape, parts);
  const symbols = new Map([R, less, between].map((relation) => [relation.name, relation]));
  const obligations = obligationsFor(reason, symbols)!;
  return {
    reason,
    obligations: obligations.map(({ role, formula }) => ({ role, formula, derivation: null })),
  };
}
