/** The reasons that are tried, best first. */
import { and, equal, exists, type Formula, not, type RelationSymbol, verum } from "../../logic/formula.ts";
import type { PrincipleRecord } from "../../logic/records/finiteness.ts";
import type { Signature } from "../../logic/theory.ts";
import type { Clues } from "./clues.ts";
import * as parts from "./parts.ts";
import { type FinitenessReason, type PrincipleShape, reasonOf } from "./reason.ts";

/** How likely a reason is, from 0. */
export type Tier = 0 | 1 | 2 | 3;

export interface Candidate {
  readonly tier: Tier;
  readonly reason: FinitenessReason;
  /** The same reason for all elements; while what it asks of its relation is not known, the reason is put off. Null for itself. */
  readonly wider: FinitenessReason | null;
}

const order: PrincipleShape = { principle: "endless-order" };

export function candidatesOf(signature: Signature, clues: Clues): readonly Candidate[] {
  const collector = new Collector(signature, clues);
  collector.collect();
  return collector.found;
}

class Collector {
  readonly found: Candidate[] = [];
  readonly #seen = new Set<string>();
  readonly #signature: Signature;
  readonly #clues: Clues;
  readonly #different: "identity" | readonly (readonly [string, number])[];

  constructor(signature: Signature, clues: Clues) {
    this.#signature = signature;
    this.#clues = clues;
    this.#different = signature.identity
      ? "identity"
      : signature.relations.map(({ name, places }: RelationSymbol) => [name, places] as const);
  }

  collect(): void {
    const { identity } = this.#signature;
    const bases = parts.basesOf(this.#signature, this.#clues);
    const steps = this.#clues.steps.flatMap((step) => parts.stepParts(step));
    const unequal = (formula: Formula) => and(formula, not(equal("x", "y")));
    const inclusions = bases.map(parts.strictlyContains);
    const injective = [this.#counting(1, 1, "fewer-predecessors"), this.#counting(1, 1, "more-successors")];
    const branching = this.#counting(2, 1, null);

    for (const base of bases) {
      this.#add(0, order, parts.strict(base));
      this.#add(0, order, base);
      if (identity) this.#add(0, order, unequal(base));
    }
    for (const { relation } of steps) this.#add(0, order, relation);
    for (const inclusion of inclusions) this.#add(0, order, inclusion);
    for (const base of bases) for (const shape of injective) this.#add(0, shape, base);
    for (const base of bases)
      for (const shape of injective) this.#add(0, shape, parts.privately(base, this.#signature));
    for (const base of bases) this.#add(0, branching, base);
    for (const { relation } of steps)
      for (const shape of [...injective, branching]) this.#add(0, shape, relation);

    const orders = [
      ...bases.flatMap((base) => [parts.strict(base), base, ...(identity ? [unequal(base)] : [])]),
      ...steps.map(({ relation }) => relation),
      ...inclusions,
    ];
    const maps = [
      ...bases,
      ...bases.map((base) => parts.privately(base, this.#signature)),
      ...steps.map(({ relation }) => relation),
    ];
    const self = parts.selfParts(this.#signature);
    const guards = steps.flatMap(({ domain }) => (domain === null ? [] : [domain]));
    const transitive = bases.flatMap(parts.transitiveParts);
    const witnessed = this.#clues.witnesses.flatMap((witness) =>
      parts.witnessParts(bases, witness, identity),
    );
    const domains: readonly parts.UnaryPart[] = [
      ...[...guards, ...self].map((formula) => ({ formula, witness: null })),
      ...witnessed,
      ...transitive.map((formula) => ({ formula, witness: null })),
    ];
    for (const relation of orders)
      this.#add(1, order, relation, { formula: exists("y", relation), witness: null });
    for (const [relation, domain] of diagonal(orders, domains)) this.#add(1, order, relation, domain);
    for (const [relation, domain] of diagonal(maps, domains))
      for (const shape of [...injective, branching]) this.#add(1, shape, relation, domain);

    for (const domain of self)
      for (const first of bases)
        for (const second of bases) {
          const relation = parts.composed(first, second, negatedPart(domain));
          for (const shape of [order, ...injective])
            this.#add(2, shape, relation, { formula: domain, witness: null });
        }
    const composed = bases.flatMap((first) => bases.map((second) => parts.composed(first, second)));
    for (const relation of composed) for (const shape of [order, ...injective]) this.#add(2, shape, relation);
    for (const relation of this.#pairsOfLiterals(bases))
      for (const shape of [order, ...injective]) this.#add(2, shape, relation);
    for (const base of bases) {
      this.#add(3, this.#counting(2, 2, "fewer-predecessors"), base);
      this.#add(3, this.#counting(2, 2, "more-successors"), base);
      this.#add(3, this.#counting(3, 2, null), base);
      this.#add(3, { principle: "comprehension", different: this.#different }, base);
    }
  }

  #counting(k: number, j: number, spare: "fewer-predecessors" | "more-successors" | null): PrincipleShape {
    return { principle: "counting", successors: k, predecessors: j, spare, different: this.#different };
  }

  #pairsOfLiterals(bases: readonly Formula[]): readonly Formula[] {
    const literals = [
      ...bases,
      ...this.#signature.relations.flatMap((_) => []),
      ...parts.selfParts(this.#signature),
      ...parts.selfParts(this.#signature).map((one) => parts.at(one, "y")),
      ...(this.#signature.identity ? [not(equal("x", "y"))] : []),
    ];
    return bases.flatMap((base) =>
      literals.filter((other) => other !== base).map((other) => and(base, other)),
    );
  }

  #add(tier: Tier, shape: PrincipleShape, relation: Formula, domain: parts.UnaryPart | null = null): void {
    const everywhere = reasonOf(shape, { domain: verum, relation, witness: null });
    if (
      shape.principle !== "endless-order" &&
      shape.different !== "identity" &&
      mentionsIdentity(everywhere.record)
    )
      return;
    const reason =
      domain === null
        ? everywhere
        : reasonOf(shape, { domain: domain.formula, relation, witness: domain.witness });
    const text = JSON.stringify(reason.record);
    if (this.#seen.has(text)) return;
    this.#seen.add(text);
    this.found.push({ tier, reason, wider: domain === null ? null : everywhere });
  }
}

function negatedPart(formula: Formula): Formula {
  return formula.kind === "not" ? formula.body : not(formula);
}

function mentionsIdentity({ relation, domain }: PrincipleRecord): boolean {
  return /"="/.test(JSON.stringify([relation, domain]));
}

/** All pairs of members, those of small numbers first. */
function diagonal<One, Other>(
  ones: readonly One[],
  others: readonly Other[],
): readonly (readonly [One, Other])[] {
  const found: (readonly [One, Other])[] = [];
  for (let sum = 0; sum < ones.length + others.length - 1; sum += 1)
    for (let i = Math.max(0, sum - others.length + 1); i <= Math.min(sum, ones.length - 1); i += 1)
      found.push([ones[i]!, others[sum - i]!]);
  return found;
}
