/**
 * The reasons that are tried. What a principle asks of φ alone, that it is a strict order or that elements have few
 * predecessors, is put to all elements first; where it follows, φ is tried on parts of the elements too.
 */
import { and, exists, type Formula, verum } from "../../logic/formula.ts";
import type { Signature } from "../../logic/theory.ts";
import { cluesOf, negated } from "./clues.ts";
import * as parts from "./parts.ts";
import {
  type Different,
  type FinitenessReason,
  type PrincipleShape,
  reasonOf,
  type Witness,
} from "./reason.ts";

/** A principle with its φ, to be tried on all elements or on parts of them. */
export interface Family {
  readonly shape: PrincipleShape;
  readonly relation: parts.Part;
}

/** The likeliest literals, and how many of them are put together in pairs. */
const MOST_BASES = 12;
const MOST_PAIRED = 6;

const order: PrincipleShape = { principle: "endless-order", everywhere: true };

export class Candidates {
  /** To be tried on all elements, best first. */
  readonly likely: readonly Family[];
  /** To be tried on parts: of each list the first whose φ is as its principle asks. */
  readonly alternatives: readonly (readonly Family[])[];
  /** Orders by inclusion, to be tried on parts. */
  readonly inclusions: readonly Family[];
  /** Reasons on parts of the elements on which φ may be as its principle asks, and not elsewhere. */
  readonly special: readonly FinitenessReason[];
  /** To be tried on all elements, less likely. */
  readonly unlikely: readonly Family[];
  readonly rare: readonly Family[];
  readonly #domains: readonly parts.Part[];

  constructor(axioms: readonly Formula[], signature: Signature) {
    const clues = cluesOf(axioms);
    const principles = principlesOf(signature);
    const { injective, maps } = principles;
    const ranked = parts.basesOf(signature, clues);
    const likely = ranked.filter(({ partners }) => partners > 0);
    const bases = (likely.length > 0 ? likely : ranked).slice(0, MOST_BASES);
    const others = ranked.filter((base) => !bases.includes(base));
    const formulas = bases.flatMap(({ formula, witness }) => (witness === null ? [formula] : []));
    const steps = clues.steps.flatMap(parts.stepPartsOf);
    const relations = unique(steps.map(({ relation }) => relation));
    const { sorts, loops } = parts.selfPartsOf(signature, axioms);
    const self = [...sorts, ...loops];

    const ordersOf = ({ formula, witness }: parts.Part): readonly Family[] =>
      [formula, ...(signature.identity ? [parts.unequal(formula)] : []), parts.strict(formula)].map(
        (own) => ({
          shape: order,
          relation: { formula: own, witness },
        }),
      );
    const mapsOf = ({ formula, witness }: parts.Part, shape: PrincipleShape): readonly Family[] =>
      [formula, parts.privately(formula, signature)].map((own) => ({
        shape,
        relation: { formula: own, witness },
      }));
    const orders = [...bases.map(ordersOf), ...relations.map((relation) => [{ shape: order, relation }])];
    const counted = [
      ...bases.flatMap((base) => maps.map((shape) => mapsOf(base, shape))),
      ...relations.flatMap((relation) => maps.map((shape) => [{ shape, relation }])),
    ];
    this.inclusions = bases.map(({ formula, witness }) => ({
      shape: order,
      relation: { formula: parts.strictlyContains(formula), witness },
    }));
    this.likely = unique([
      ...orders.flatMap((families) => families.toReversed()),
      ...this.inclusions,
      ...counted.flatMap((families) => families.slice(0, 1)),
      ...counted.flatMap((families) => families.slice(1)),
    ]);
    this.alternatives = [...orders, ...counted];
    this.#domains = unique([
      ...steps.flatMap(({ domain }) => domain ?? []),
      ...self.map((formula) => ({ formula, witness: null })),
      ...clues.witnesses.flatMap((witness) => parts.witnessPartsOf(formulas, witness, signature.identity)),
    ]);
    const paired = formulas.slice(0, MOST_PAIRED);
    const pairs = paired.flatMap((first) => paired.map((second) => [first, second] as const));
    const isIn = (domain: Formula, families: readonly Family[]) =>
      families.flatMap(({ shape, relation: { formula, witness } }) =>
        witness === null ? [there(shape, domain, parts.within(formula, domain))] : [],
      );
    this.special = [
      ...steps.flatMap(({ relation, domain }) =>
        domain === null
          ? []
          : [order, ...maps].map((shape) =>
              reasonOf(restrict(shape), {
                domain: domain.formula,
                relation: relation.formula,
                witness: relation.witness,
              }),
            ),
      ),
      ...sorts.flatMap((domain) => isIn(domain, this.likely)),
      ...loops.flatMap((domain) =>
        formulas.flatMap((relation) => [order, ...maps].map((shape) => there(shape, domain, relation))),
      ),
      ...formulas.flatMap((base) =>
        parts
          .transitivePartsOf(base)
          .flatMap((domain) =>
            [base, parts.converse(base)].map((relation) => there(order, domain, relation)),
          ),
      ),
      ...self.flatMap((domain) =>
        pairs.flatMap(([first, second]) =>
          [order, ...injective].map((shape) =>
            there(shape, domain, parts.composed(first, second, negated(domain))),
          ),
        ),
      ),
      ...sorts.flatMap((sort) =>
        orders.flat().flatMap(({ shape, relation: { formula, witness } }) => {
          const relation = parts.within(formula, sort);
          return witness === null
            ? [there(shape, and(sort, exists("y", and(parts.at(sort, "y"), relation))), relation)]
            : [];
        }),
      ),
    ];
    this.unlikely = unique([
      ...others.flatMap((base) => [...ordersOf(base), ...maps.flatMap((shape) => mapsOf(base, shape))]),
      ...others.map(({ formula, witness }) => ({
        shape: order,
        relation: { formula: parts.strictlyContains(formula), witness },
      })),
      ...[
        ...pairs.map(([first, second]) => parts.composed(first, second)),
        ...pairsOfLiterals(formulas, [
          ...others.flatMap((base) => (base.witness === null ? [base.formula] : [])).slice(0, MOST_PAIRED),
          ...self,
        ]),
      ].flatMap((formula) =>
        [order, ...injective].map((shape) => ({ shape, relation: { formula, witness: null } })),
      ),
    ]);
    this.rare = formulas.flatMap((formula) =>
      principles.rare.map((shape) => ({ shape, relation: { formula, witness: null } })),
    );
  }

  /** Reasons on parts of the elements, φ being as its principle asks of all of them. */
  *onParts({ shape, relation: { formula, witness } }: Family): Generator<FinitenessReason> {
    yield reasonOf(shape, { domain: exists("y", formula), relation: formula, witness });
    for (const domain of this.#domains) {
      const joint = jointWitness(witness, domain.witness);
      if (joint !== undefined)
        yield reasonOf(shape, { domain: domain.formula, relation: formula, witness: joint });
    }
  }

  /** Reasons on parts of the elements, φ being as its principle asks there. */
  *restricted(): Generator<FinitenessReason> {
    for (const domain of this.#domains)
      for (const { shape, relation } of this.likely) {
        const witness = jointWitness(relation.witness, domain.witness);
        if (witness !== undefined)
          yield reasonOf(restrict(shape), { domain: domain.formula, relation: relation.formula, witness });
      }
  }
}

/** A reason for all elements. */
export function everywhere({ shape, relation: { formula, witness } }: Family): FinitenessReason {
  return reasonOf(shape, { domain: verum, relation: formula, witness });
}

function there(shape: PrincipleShape, domain: Formula, relation: Formula): FinitenessReason {
  return reasonOf(restrict(shape), { domain, relation, witness: null });
}

function restrict(shape: PrincipleShape): PrincipleShape {
  return "everywhere" in shape ? { ...shape, everywhere: false } : shape;
}

function principlesOf({ relations, identity }: Signature) {
  const different: Different = identity
    ? "identity"
    : relations.map(({ name, places }) => [name, places] as const);
  const counting = (
    successors: number,
    predecessors: number,
    spare: "fewer-predecessors" | "more-successors" | null,
  ): PrincipleShape => ({
    principle: "counting",
    successors,
    predecessors,
    spare,
    everywhere: true,
    different,
  });
  const injective = [counting(1, 1, "fewer-predecessors"), counting(1, 1, "more-successors")];
  return {
    injective,
    maps: [...injective, counting(2, 1, null)],
    rare: [
      counting(2, 2, "fewer-predecessors"),
      counting(2, 2, "more-successors"),
      counting(3, 2, null),
      { principle: "comprehension", different } as const,
    ],
  };
}

/** The witness of two parts together; undefined when they have different ones. */
function jointWitness(one: Witness | null, other: Witness | null): Witness | null | undefined {
  if (one === null || one === other) return other;
  return other === null ? one : undefined;
}

/** φ and another literal of x and y, or of one of them. */
function pairsOfLiterals(bases: readonly Formula[], others: readonly Formula[]): readonly Formula[] {
  const literals = unique([...bases, ...others, ...others.map((one) => parts.at(one, "y"))]);
  return bases.flatMap((base, place) => literals.slice(place + 1).map((other) => and(base, other)));
}

function unique<Member>(members: readonly Member[]): readonly Member[] {
  return [...new Map(members.map((member) => [JSON.stringify(member), member])).values()];
}
