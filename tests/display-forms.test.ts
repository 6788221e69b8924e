/** What displays read off formulas, and the commands of their LaTeX. */
import temml from "temml";
import { describe, expect, it } from "vitest";
import { prefixOf } from "../kernel/display/theories.ts";
import { SIGNS } from "../kernel/display/to-latex.ts";
import {
  and,
  atom,
  equal,
  exists,
  type Formula,
  forall,
  iff,
  implies,
  not,
  or,
  type RelationSymbol,
} from "../lib/logic/formula.ts";

const R: RelationSymbol = { name: "R", places: 2, infix: false };
const serial = forall("x", exists("y", atom(R, "x", "y")));

describe("signs of LaTeX", () => {
  it.each([...SIGNS])("%s is a command that a reader of mathematics knows", (_, command) => {
    expect(temml.renderToString(command, { throwOnError: true })).toContain("<math>");
  });
});

describe("prefix of a prenex form", () => {
  const some = exists("y", atom(R, "x", "y"));
  // By the rules for pulling quantifiers outwards; parts of a conjunction share universal variables (common practice).
  it.each<[string, Formula, string]>([
    ["in front already", serial, "∀∃"],
    ["to the right of a conditional", forall("x", implies(atom(R, "x", "x"), some)), "∀∃"],
    ["to the left of a conditional", forall("x", implies(some, atom(R, "x", "x"))), "∀∀"],
    ["under a negation", not(forall("x", some)), "∃∀"],
    ["side by side, put together", and(forall("x", some), forall("z", not(atom(R, "z", "z")))), "∀∃"],
    ["on both sides of a biconditional", forall("x", iff(some, atom(R, "x", "x"))), "∀∀∃"],
    ["none", equal("x", "y"), "none"],
    [
      "many",
      forall(["x", "y", "z", "u", "v"], or(atom(R, "x", "y"), atom(R, "z", "u"), atom(R, "v", "x"))),
      "∀⁵",
    ],
    ["vacuous", forall(["x", "y"], atom(R, "x", "x")), "∀"],
  ])("%s", (_, formula, prefix) => {
    expect(prefixOf(formula)).toBe(prefix);
  });
});
