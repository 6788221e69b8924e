/**
 * Formulas φ(x, y) and δ(x) of which reasons are made: relations of the signature, what axioms say in their steps, and what can
 * be put together of these.
 */
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
  sameFormula,
  substitute,
  type Variable,
  variablesOf,
  verum,
} from "../../logic/formula.ts";
import type { Signature } from "../../logic/theory.ts";
import { type Clues, negated, partnerKey, type Step } from "./clues.ts";
import type { Witness } from "./reason.ts";

/** A formula φ in x and y or δ in x, and in the parameters of a witness. */
export interface Part {
  readonly formula: Formula;
  readonly witness: Witness | null;
}

/** Variables beside x and y. */
const OTHERS = ["z", "w", "u", "v", "z1", "w1", "u1", "v1"];

/** Relations with more places are left out. */
const MOST_PLACES = 5;

/** The formula with other elements for x and y. */
export function at(formula: Formula, x: Variable, y: Variable = "y"): Formula {
  return substitute(
    formula,
    new Map([
      ["x", x],
      ["y", y],
    ]),
  );
}

export function converse(formula: Formula): Formula {
  return at(formula, "y", "x");
}

/** φ(x, y) without φ(y, x). */
export function strict(formula: Formula): Formula {
  return and(formula, negated(converse(formula)));
}

/** φ(x, y) for different x and y. */
export function unequal(formula: Formula): Formula {
  return and(formula, not(equal("x", "y")));
}

/** x is related to all that y is, and to more. Whatever φ is, this is a strict order. */
export function strictlyContains(formula: Formula): Formula {
  const [ofX, ofY] = [at(formula, "x", "z"), at(formula, "y", "z")];
  return and(forall("z", implies(ofY, ofX)), exists("z", and(ofX, negated(ofY))));
}

/** x is related to y, and nothing else is. */
export function privately(formula: Formula, signature: Signature): Formula {
  return and(formula, forall("z", implies(at(formula, "z", "y"), sameness(signature, "z", "x"))));
}

/** Whether two elements are the same by identity or, where there is none, for the relations of the signature. */
function sameness({ relations, identity }: Signature, one: Variable, other: Variable): Formula {
  if (identity) return equal(one, other);
  return and(
    ...relations.flatMap((relation) => {
      const others = OTHERS.filter((name) => name !== one && name !== other).slice(0, relation.places - 1);
      const holds = (element: Variable, place: number) =>
        atom(relation, ...others.toSpliced(place, 0, element));
      return Array.from({ length: relation.places }, (_, place) =>
        forall(others, iff(holds(one, place), holds(other, place))),
      );
    }),
  );
}

/** φ and another literal of x and y, or of one of them. */
export function conjunctions(bases: readonly Formula[], others: readonly Formula[]): readonly Formula[] {
  const literals = [...bases, ...others, ...others.map((one) => at(one, "y", "x"))];
  return bases.flatMap((base, place) => literals.slice(place + 1).map((other) => and(base, other)));
}

/** By way of a z, which may have to be in a part of the elements. */
export function composed(first: Formula, second: Formula, between: Formula = verum): Formula {
  const way = [at(first, "x", "z"), at(second, "z", "y")];
  return exists("z", between.kind === "true" ? and(...way) : and(at(between, "z"), ...way));
}

/** φ(x, y) that is one literal, and how often axioms say that there is such a y for an x. */
export interface Base extends Part {
  readonly partners: number;
}

/**
 * Literals of one relation, those that axioms speak of most first. Of relations with more than two places, two are x
 * and y; at the others there is one element, of a witness or whichever it is, or anything, x or y.
 */
export function basesOf({ relations }: Signature, clues: Clues): readonly Base[] {
  const found = relations
    .filter(({ places }) => places >= 2 && places <= MOST_PLACES)
    .flatMap((relation) =>
      [true, false].flatMap((isPositive) =>
        pairsOf(relation.places).flatMap(([first, second]) => {
          const partners = clues.partners.get(partnerKey(relation, isPositive, first, second)) ?? 0;
          return literalsOf(relation, first, second, isPositive, clues.witnesses).map((part) => ({
            ...part,
            partners,
          }));
        }),
      ),
    );
  return found.sort((a, b) => b.partners - a.partners);
}

function literalsOf(
  relation: RelationSymbol,
  first: number,
  second: number,
  isPositive: boolean,
  witnesses: readonly Witness[],
): readonly Part[] {
  const literal = (others: (place: number) => Variable) => {
    const args = Array.from({ length: relation.places }, (_, place) =>
      place === first ? "x" : place === second ? "y" : others(place),
    );
    return isPositive ? atom(relation, ...args) : not(atom(relation, ...args));
  };
  if (relation.places === 2) return [{ formula: literal(() => "x"), witness: null }];
  const names = OTHERS.slice(0, relation.places);
  const rest = names.filter((_, place) => place !== first && place !== second);
  const kept = [...witnesses, { parameters: ["a"], given: verum }];
  return [
    ...kept.flatMap((witness) =>
      witness.parameters.map((parameter) => ({ formula: literal(() => parameter), witness })),
    ),
    {
      formula: exists(
        rest,
        literal((place) => names[place]!),
      ),
      witness: null,
    },
    { formula: literal(() => "x"), witness: null },
    { formula: literal(() => "y"), witness: null },
  ];
}

function pairsOf(places: number): readonly (readonly [number, number])[] {
  const all = [...Array(places).keys()];
  return all.flatMap((first) =>
    all.flatMap((second) => (first === second ? [] : [[first, second] as const])),
  );
}

/** φ that a step of an axiom leads along, and δ from which it starts; null for everything. */
export interface StepPart {
  readonly relation: Part;
  readonly domain: Part | null;
}

/** From each start of a step: the other elements that it depends on are the same, or any, or some that are kept. */
export function stepPartsOf({ witness, from, guard, to, body }: Step): readonly StepPart[] {
  const found: StepPart[] = [];
  const add = (relation: Formula, domain: Formula, own: Witness | null = witness) => {
    const allowed = ["x", "y", ...(own?.parameters ?? [])];
    const free = freeVariables(relation);
    if (!free.includes("x") || !free.includes("y") || free.some((one) => !allowed.includes(one))) return;
    const isWhole = !freeVariables(domain).includes("x");
    found.push({
      relation: { formula: tidy(relation), witness: own },
      domain: isWhole ? null : { formula: tidy(domain), witness: own },
    });
  };
  for (const start of from) {
    const others = from.filter((one) => one !== start);
    const merged = new Map(from.map((one) => [one, "x"])).set(to, "y");
    add(substitute(body, merged), substitute(guard, merged));
    if (others.length === 0 || others.length > 2) continue;
    const taken = new Set([...variablesOf(body), ...variablesOf(guard), ...(witness?.parameters ?? [])]);
    const name = (names: readonly string[]) => names.filter((one) => !taken.has(one)).slice(0, others.length);
    for (const names of [name(OTHERS), name(PARAMETERS)]) {
      const renaming = new Map(others.map((one, place) => [one, names[place]!])).set(start, "x").set(to, "y");
      const [relation, domain] = [substitute(body, renaming), substitute(guard, renaming)];
      if (names[0] === "z") add(exists(names, and(domain, relation)), exists(names, domain));
      else if (witness === null) {
        const isWhole = domain.kind === "true";
        add(relation, domain, { parameters: names, given: isWhole ? verum : exists("x", domain) });
      }
    }
  }
  return found;
}

const PARAMETERS = [..."abcdefgh"];

/** φ(x, y, z) that an axiom says is true of some z for all x and y, and what relations of three places say. */
export function pairPartsOf({ relations }: Signature, steps: readonly Step[]): readonly Formula[] {
  const ofSteps = steps.flatMap(({ witness, from, guard, to, body }) => {
    if (witness !== null || from.length !== 2 || guard.kind !== "true") return [];
    const [one, other] = from as [Variable, Variable];
    return [
      substitute(
        body,
        new Map([
          [one, "x"],
          [other, "y"],
          [to, "z"],
        ]),
      ),
    ];
  });
  const orders = [
    ["x", "y", "z"],
    ["x", "z", "y"],
    ["z", "x", "y"],
  ];
  const ofRelations = relations
    .filter(({ places }) => places === 3)
    .flatMap((relation) => orders.map((order) => atom(relation, ...order)));
  return [...ofSteps, ...ofRelations];
}

/** Without repeated parts, which come of two variables being made one. */
function tidy(formula: Formula): Formula {
  const inner = mapParts(formula, tidy);
  if (inner.kind !== "and" && inner.kind !== "or") return inner;
  const parts = [...new Map(inner.parts.map((part) => [JSON.stringify(part), part])).values()];
  return (inner.kind === "and" ? and : or)(...parts);
}

/** Parts of the elements by relations of one place. */
export function sortsOf({ relations }: Signature): readonly Formula[] {
  return relations
    .filter(({ places }) => places === 1)
    .flatMap((relation) => withNegation(atom(relation, "x")));
}

/** Parts of the elements by relations of two places to themselves, where axioms do not say that all or none have them. */
export function loopsOf({ relations }: Signature, axioms: readonly Formula[]): readonly Formula[] {
  const isSettled = (loop: Formula) => axioms.some((axiom) => sameFormula(axiom, forall("x", loop)));
  return relations
    .filter(({ places }) => places === 2)
    .map((relation) => withNegation(atom(relation, "x", "x")))
    .flatMap((both) => (both.some(isSettled) ? [] : both));
}

function withNegation(formula: Formula): readonly Formula[] {
  return [formula, not(formula)];
}

/** The formula with all its quantifiers about a part of the elements. */
export function within(formula: Formula, sort: Formula): Formula {
  const inner = mapParts(formula, (part) => within(part, sort));
  if (inner.kind === "forall") return { ...inner, body: implies(at(sort, inner.variable), inner.body) };
  return inner.kind === "exists" ? { ...inner, body: and(at(sort, inner.variable), inner.body) } : inner;
}

/** Elements without loops through which a relation is transitive, backwards and forwards. */
export function transitivePartsOf(base: Formula): readonly Formula[] {
  const through = (relation: Formula) =>
    forall(["y", "z"], implies(and(at(relation, "z", "y"), at(relation, "y", "x")), at(relation, "z", "x")));
  const own = negated(at(base, "x", "x"));
  return [and(own, through(base)), and(own, through(converse(base)))];
}

/** Parts of the elements around those of a witness. */
export function witnessPartsOf(
  bases: readonly Formula[],
  witness: Witness,
  identity: boolean,
): readonly Part[] {
  const { parameters } = witness;
  const around = parameters.flatMap((parameter) =>
    bases.flatMap((base) => {
      const [before, after] = [at(base, "x", parameter), at(base, parameter, "x")];
      return [before, after, and(before, negated(after)), and(after, negated(before))];
    }),
  );
  const others = identity ? parameters.map((parameter) => not(equal("x", parameter))) : [];
  const withIt = identity
    ? parameters.flatMap((parameter) =>
        bases.flatMap((base) =>
          [at(base, "x", parameter), at(base, parameter, "x")].map((part) => or(equal("x", parameter), part)),
        ),
      )
    : [];
  const between =
    parameters.length < 2
      ? []
      : bases.flatMap((base) =>
          [parameters, parameters.toReversed()].map(([one, other]) =>
            and(at(base, one!, "x"), at(base, "x", other!)),
          ),
        );
  return [...around, ...others, ...withIt, ...between].map((formula) => ({ formula, witness }));
}
