/**
 * Formulas φ(x, y) and δ(x) of which reasons are made: relations of the signature and their parts, what axioms say in
 * their steps, and what can be put together of these.
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
  not,
  or,
  type RelationSymbol,
  substitute,
  type Variable,
  variablesOf,
} from "../../logic/formula.ts";
import type { Signature } from "../../logic/theory.ts";
import { type Clues, negated, partnerKey, type Step } from "./clues.ts";
import type { Witness } from "./reason.ts";

/** A formula in x and y; when it has parameters too, with the witness that they come from. */
export interface BinaryPart {
  readonly formula: Formula;
  readonly witness: Witness | null;
}
/** A formula in x. */
export interface UnaryPart {
  readonly formula: Formula;
  readonly witness: Witness | null;
}

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

/** What y is related to, x is, and x is to something more. */
export function strictlyContains(formula: Formula): Formula {
  const [ofX, ofY] = [at(formula, "x", "z"), at(formula, "y", "z")];
  return and(forall("z", implies(ofY, ofX)), exists("z", and(ofX, negated(ofY))));
}

/** Everything that y is related to, x is. */
export function contains(formula: Formula): Formula {
  return forall("z", implies(at(formula, "y", "z"), at(formula, "x", "z")));
}

/** Whether two elements are the same, in identity or, where there is none, for the relations of the signature. */
export function sameness({ relations, identity }: Signature, one: Variable, other: Variable): Formula {
  if (identity) return equal(one, other);
  return and(
    ...relations.flatMap((relation) =>
      Array.from({ length: relation.places }, (_, place) => {
        const names = OTHERS.filter((name) => name !== one && name !== other).slice(0, relation.places - 1);
        const holds = (element: Variable) => atom(relation, ...names.toSpliced(place, 0, element));
        return forall(names, iff(holds(one), holds(other)));
      }),
    ),
  );
}

const OTHERS = ["z", "w", "u", "v", "z1", "w1", "u1", "v1", "z2", "w2", "u2", "v2"];

/** y is related to x and to nothing else. */
export function privately(formula: Formula, signature: Signature): Formula {
  return and(formula, forall("z", implies(at(formula, "z", "y"), sameness(signature, "z", "x"))));
}

/** By the way of a z between. */
export function composed(first: Formula, second: Formula, between: Formula | null = null): Formula {
  const way = [at(first, "x", "z"), at(second, "z", "y")];
  return exists("z", and(...(between === null ? [] : [at(between, "z")]), ...way));
}

/** Literals φ(x, y) of one relation, those first of which axioms say that there is a y for x. */
export function basesOf({ relations }: Signature, clues: Clues): readonly Formula[] {
  const found = relations.flatMap((relation) => [true, false].flatMap((sign) => literalsOf(relation, sign)));
  return found
    .map((base, place) => ({ ...base, place, partners: clues.partners.get(base.key) ?? 0 }))
    .sort((a, b) => b.partners - a.partners || a.place - b.place)
    .map(({ formula }) => formula);
}

function literalsOf(relation: RelationSymbol, sign: boolean) {
  const found: { readonly formula: Formula; readonly key: string }[] = [];
  const signed = (formula: Formula) => (sign ? formula : not(formula));
  for (let first = 0; first < relation.places; first += 1)
    for (let second = 0; second < relation.places; second += 1) {
      if (first === second) continue;
      const key = partnerKey(relation, sign, first, second);
      if (relation.places === 2) {
        const args = first === 0 ? ["x", "y"] : ["y", "x"];
        found.push({ formula: signed(atom(relation, ...args)), key });
        continue;
      }
      if (relation.places > MOST_PLACES) continue;
      const names = OTHERS.slice(0, relation.places - 2);
      const rest = (name: (place: number) => Variable) => {
        let place = 0;
        const args = Array.from({ length: relation.places }, (_, i) =>
          i === first ? "x" : i === second ? "y" : name(place++),
        );
        return atom(relation, ...args);
      };
      const open = rest((place) => names[place]!);
      found.push(
        { formula: exists(names, signed(open)), key },
        { formula: signed(rest(() => "x")), key },
        { formula: signed(rest(() => "y")), key },
      );
    }
  return found;
}

/** Relations with more places are left out. */
const MOST_PLACES = 5;

/** What is made of one step of an axiom: φ, and the domain on which the axiom says that it has successors. */
export interface StepParts {
  readonly relation: Formula;
  /** Null for everything. */
  readonly domain: Formula | null;
}

export function stepParts({ from, guard, to, body }: Step): readonly StepParts[] {
  const found: StepParts[] = [];
  for (const start of from) {
    const others = from.filter((one) => one !== start);
    // All others the same as the start, or any.
    const merged = new Map<Variable, Variable>([
      ...from.map((one): [Variable, Variable] => [one, "x"]),
      [to, "y"],
    ]);
    add(substitute(body, merged), substitute(guard, merged));
    if (others.length === 0 || others.length > 2) continue;
    const renaming = new Map<Variable, Variable>([[start, "x"], [to, "y"], ...renamed(others)]);
    const names = others.map((one) => renaming.get(one)!);
    const [own, condition] = [substitute(body, renaming), substitute(guard, renaming)];
    add(exists(names, and(condition, own)), exists(names, condition));
  }
  return found;

  function renamed(others: readonly Variable[]): [Variable, Variable][] {
    const taken = new Set([...variablesOf(body), ...variablesOf(guard)]);
    const free = OTHERS.filter((name) => !taken.has(name));
    return others.map((one, place) => [one, free[place]!]);
  }

  function add(relation: Formula, domain: Formula): void {
    const free = freeVariables(relation);
    if (free.includes("x") && free.includes("y") && free.length === 2)
      found.push({ relation, domain: freeVariables(domain).length === 0 ? null : domain });
  }
}

/** Parts of the elements, by one relation or what elements say of themselves. */
export function selfParts({ relations }: Signature): readonly Formula[] {
  return relations.flatMap((relation) => {
    const own = atom(relation, ...Array.from({ length: relation.places }, () => "x"));
    return relation.places <= 2 ? [own, not(own)] : [];
  });
}

/** Elements without loops through which a relation is transitive: x is such that what is related to y is to x. */
export function transitiveParts(base: Formula): readonly Formula[] {
  const through = (relation: Formula) =>
    forall(["y", "z"], implies(and(at(relation, "z", "y"), at(relation, "y", "x")), at(relation, "z", "x")));
  const own = negated(at(base, "x", "x"));
  return [and(own, through(base)), and(own, through(converse(base)))];
}

/** Parts of the elements around a witness. */
export function witnessParts(
  bases: readonly Formula[],
  witness: Witness,
  identity: boolean,
): readonly UnaryPart[] {
  const found: Formula[] = [];
  for (const parameter of witness.parameters) {
    for (const base of bases) {
      const [before, after] = [at(base, "x", parameter), at(base, parameter, "x")];
      found.push(before, and(before, negated(after)));
    }
    if (identity) {
      found.push(not(equal("x", parameter)));
      for (const base of bases) found.push(or(equal("x", parameter), at(base, "x", parameter)));
    }
  }
  if (witness.parameters.length >= 2)
    for (const base of bases)
      for (const [one, other] of [witness.parameters, [...witness.parameters].reverse()])
        found.push(and(at(base, one!, "x"), at(base, "x", other!)));
  return found.map((formula) => ({ formula, witness }));
}
