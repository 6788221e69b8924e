/**
 * The reasons that are tried. What a principle asks of φ alone, that it is a strict order or that elements have few
 * predecessors, is put to all elements first; where it follows, φ is tried on parts of the elements too.
 *
 * Of some 200 sets without finite models in tests/data, their converses and their complements, the lists below cover all
 * but one; which reason they have is nearly always one of the first dozen.
 */
import { and, exists, type Formula, forall, sameFormula, verum } from "../../logic/formula.ts";
import type { Signature } from "../../logic/theory.ts";
import { type Clues, cluesOf, negated } from "./clues.ts";
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
/** Of what axioms say, and of what can be said of an element alone. */
const MOST_STEPS = 40;
const MOST_WITNESSES = 8;
const MOST_SORTS = 6;
const MOST_LOOPS = 8;
/** Parts of the elements that are looked at, and literals that those around a witness are made of. */
const MOST_DOMAINS = 60;
const MOST_AROUND = 4;

const order: PrincipleShape = { principle: "endless-order", everywhere: true };

export class Candidates {
  /** Whether there may be any reason at all. */
  readonly areAny: boolean;
  /** Orders on parts of the elements on which an axiom says that each has a successor. */
  readonly steps: readonly FinitenessReason[];
  /** To be tried on all elements, best first. */
  readonly likely: readonly Family[];
  /** To be tried on parts: of each list the first whose φ is as its principle asks. */
  readonly alternatives: readonly (readonly Family[])[];
  /** To be tried on parts: those whose φ is as its principle asks by what it is, so that this says nothing for them. */
  readonly sure: readonly Family[];
  /** Reasons on parts of the elements on which φ may be as its principle asks, and not elsewhere. */
  readonly special: readonly FinitenessReason[];
  /** To be tried on all elements, less likely. */
  readonly unlikely: readonly Family[];
  readonly rare: readonly Family[];
  /** δ, for reasons on parts of the elements. */
  readonly #domains: readonly parts.Part[];

  readonly #axioms: readonly Formula[];
  readonly #signature: Signature;
  readonly #principles: Principles;
  /** Literals for which axioms say that there are partners; all of them where they say so of none. */
  readonly #bases: readonly parts.Part[];
  readonly #otherBases: readonly parts.Part[];
  readonly #steps: readonly parts.StepPart[];
  readonly #sorts: readonly Formula[];
  readonly #loops: readonly Formula[];

  constructor(axioms: readonly Formula[], signature: Signature) {
    const all = cluesOf(axioms);
    const clues = { ...all, witnesses: all.witnesses.slice(0, MOST_WITNESSES) };
    this.areAny = clues.hasSteps;
    this.#axioms = axioms;
    this.#signature = signature;
    this.#principles = principlesOf(signature);
    const ranked = parts.basesOf(signature, clues);
    const withPartners = ranked.filter(({ partners }) => partners > 0);
    this.#bases = (withPartners.length > 0 ? withPartners : ranked).slice(0, MOST_BASES);
    this.#otherBases = ranked.filter((base) => !this.#bases.includes(base));
    this.#steps = clues.steps.flatMap(parts.stepPartsOf).slice(0, MOST_STEPS);
    this.#sorts = parts.sortsOf(signature).slice(0, MOST_SORTS);
    this.#loops = parts.loopsOf(signature, axioms).slice(0, MOST_LOOPS);

    const ofSteps = unique(this.#steps.map(({ relation }) => relation));
    const orders = [
      ...this.#bases.map((base) => this.#ordersOf(base)),
      ...ofSteps.map((relation) => [{ shape: order, relation }]),
    ];
    const { maps } = this.#principles;
    const counted = [
      ...this.#bases.flatMap((base) => maps.map((shape) => this.#mapsOf(base, shape))),
      ...ofSteps.flatMap((relation) => maps.map((shape) => [{ shape, relation }])),
    ];
    const inclusions = this.#bases.map((base) => withRelation(order, parts.strictlyContains, base));
    this.likely = unique([
      ...orders.flat(),
      ...inclusions,
      ...counted.flatMap((families) => families.slice(0, 1)),
      ...counted.flatMap((families) => families.slice(1)),
    ]);
    // On parts, what is simplest comes first.
    this.alternatives = [...orders.map(simplestFirst), ...counted.map((families) => families.slice(0, 1))];
    this.sure = [...inclusions, ...counted.flatMap((families) => families.slice(1))];
    // Those with elements that are kept are harder to read than others that may do.
    this.steps = this.#listSteps([order]).filter(({ given }) => given === null);
    this.special = this.#listSpecial(orders.flat());
    this.unlikely = this.#listUnlikely();
    this.rare = this.#listRare(clues);
    this.#domains = this.#listDomains(clues);
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

  /** The orders that a literal may be or contain. */
  #ordersOf(base: parts.Part): readonly Family[] {
    const itself = { shape: order, relation: base };
    const strict = withRelation(order, parts.strict, base);
    const isIrreflexive = forall("x", negated(parts.at(base.formula, "x", "x")));
    if (this.#axioms.some((axiom) => sameFormula(axiom, isIrreflexive))) return [itself, strict];
    return [strict, ...(this.#signature.identity ? [withRelation(order, parts.unequal, base)] : []), itself];
  }

  #mapsOf(base: parts.Part, shape: PrincipleShape): readonly Family[] {
    return [
      { shape, relation: base },
      withRelation(shape, (formula) => parts.privately(formula, this.#signature), base),
    ];
  }

  #listSteps(shapes: readonly PrincipleShape[]): readonly FinitenessReason[] {
    return this.#steps.flatMap(({ relation: { formula, witness }, domain }) =>
      domain === null
        ? []
        : shapes.map((shape) =>
            reasonOf(restrict(shape), { domain: domain.formula, relation: formula, witness }),
          ),
    );
  }

  #listSpecial(orders: readonly Family[]): readonly FinitenessReason[] {
    const { maps, injective } = this.#principles;
    const formulas = this.#baseFormulas;
    const ofSteps = this.#listSteps([order, ...maps]);
    const inSorts = this.#sorts.flatMap((sort) =>
      this.likely.flatMap(({ shape, relation: { formula, witness } }) =>
        witness === null ? [there(shape, sort, parts.within(formula, sort))] : [],
      ),
    );
    const onLoops = this.#loops.flatMap((domain) =>
      formulas.flatMap((formula) => [order, ...maps].map((shape) => there(shape, domain, formula))),
    );
    const transitive = formulas.flatMap((base) =>
      parts
        .transitivePartsOf(base)
        .flatMap((domain) => [base, parts.converse(base)].map((formula) => there(order, domain, formula))),
    );
    // From one part of the elements to the other and back.
    const backAndForth = [...this.#sorts, ...this.#loops].flatMap((domain) =>
      this.#pairs.flatMap(([first, second]) =>
        [order, ...injective].map((shape) =>
          there(shape, domain, parts.composed(first, second, negated(domain))),
        ),
      ),
    );
    const inPartsOfSorts = this.#sorts.flatMap((sort) =>
      orders.flatMap(({ shape, relation: { formula, witness } }) => {
        if (witness !== null) return [];
        const inner = parts.within(formula, sort);
        return [there(shape, and(sort, exists("y", and(parts.at(sort, "y"), inner))), inner)];
      }),
    );
    return [...ofSteps, ...inSorts, ...onLoops, ...transitive, ...backAndForth, ...inPartsOfSorts];
  }

  #listUnlikely(): readonly Family[] {
    const { maps, injective } = this.#principles;
    const others = this.#otherBases;
    const itself = [...this.#sorts, ...this.#loops];
    const otherFormulas = others.flatMap(({ formula, witness }) => (witness === null ? [formula] : []));
    const joined = [
      ...this.#pairs.map(([first, second]) => parts.composed(first, second)),
      ...parts.conjunctions(this.#baseFormulas, [...otherFormulas.slice(0, MOST_PAIRED), ...itself]),
    ];
    return unique([
      ...others.flatMap((base) => [
        ...this.#ordersOf(base),
        ...maps.flatMap((shape) => this.#mapsOf(base, shape)),
      ]),
      ...others.map((base) => withRelation(order, parts.strictlyContains, base)),
      ...joined.flatMap((formula) =>
        [order, ...injective].map((shape) => ({ shape, relation: { formula, witness: null } })),
      ),
    ]);
  }

  #listRare(clues: Clues): readonly Family[] {
    const { rare, pairs } = this.#principles;
    const families = (shapes: readonly PrincipleShape[], formula: Formula): readonly Family[] =>
      shapes.map((shape) => ({ shape, relation: { formula, witness: null } }));
    return unique([
      ...this.#baseFormulas.flatMap((formula) => families(rare, formula)),
      ...parts.pairPartsOf(this.#signature, clues.steps).flatMap((formula) => families(pairs, formula)),
    ]);
  }

  #listDomains({ witnesses }: Clues): readonly parts.Part[] {
    return unique([
      ...this.#steps.flatMap(({ domain }) => domain ?? []),
      ...[...this.#sorts, ...this.#loops].map((formula) => ({ formula, witness: null })),
      ...witnesses.flatMap((witness) =>
        parts.witnessPartsOf(this.#baseFormulas.slice(0, MOST_AROUND), witness, this.#signature.identity),
      ),
    ]).slice(0, MOST_DOMAINS);
  }

  /** Literals without parameters. */
  get #baseFormulas(): readonly Formula[] {
    return this.#bases.flatMap(({ formula, witness }) => (witness === null ? [formula] : []));
  }

  get #pairs(): readonly (readonly [Formula, Formula])[] {
    const paired = this.#baseFormulas.slice(0, MOST_PAIRED);
    return paired.flatMap((first) => paired.map((second) => [first, second] as const));
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

function withRelation(
  shape: PrincipleShape,
  change: (formula: Formula) => Formula,
  { formula, witness }: parts.Part,
): Family {
  return { shape, relation: { formula: change(formula), witness } };
}

type Principles = ReturnType<typeof principlesOf>;

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
    pairs: [1, 2].map((most) => ({ principle: "pairs", pairs: most, different }) as const),
  };
}

/** The witness of two parts together; undefined when they have different ones. */
function jointWitness(one: Witness | null, other: Witness | null): Witness | null | undefined {
  if (one === null || one === other) return other;
  return other === null ? one : undefined;
}

function simplestFirst(families: readonly Family[]): readonly Family[] {
  const sizes = new Map(families.map((family) => [family, JSON.stringify(family.relation.formula).length]));
  return families.toSorted((a, b) => sizes.get(a)! - sizes.get(b)!);
}

function unique<Member>(members: readonly Member[]): readonly Member[] {
  return [...new Map(members.map((member) => [JSON.stringify(member), member])).values()];
}
