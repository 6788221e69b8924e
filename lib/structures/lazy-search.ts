/**
 * The search for a table on an infinite carrier. Sentences with few configurations are unfolded into clauses. Deeper ones
 * are not: a table that satisfies the clauses is tried on them, and when one fails, the entries that it failed by are
 * ruled out together. Carriers have few kinds, so that few tables are tried; and a ∃ needs to be walked only until a
 * witness is met.
 */
import type { Carrier } from "../carriers/carrier.ts";
import { listExtensions } from "../carriers/listing.ts";
import type { Structure, Table } from "../carriers/structure.ts";
import type { RelationSymbol } from "../logic/formula.ts";
import { type Meter, WorkEnded } from "../logic/meter.ts";
import { Circuit, FALSE } from "./circuit.ts";
import { Clausifier } from "./clausify.ts";
import { ground, unknownTables } from "./ground.ts";
import { Memory, mostVisits, type Plan, planSentence, type QuantifierPlan } from "./plan.ts";
import { Solver } from "./sat/solver.ts";
import type { SearchOutcome, SearchTask } from "./search.ts";
import { breakSymmetry } from "./symmetry.ts";

/** Sentences with more visits than this, at most, are tried on tables instead of being unfolded. */
const MOST_UNFOLDED = 20_000;

/** Looks for a structure on the carrier of the task. Everything it does is counted on the meter; it is deterministic. */
export function findLazily(task: SearchTask, meter: Meter): SearchOutcome {
  try {
    return search(task, meter);
  } catch (problem) {
    if (problem instanceof WorkEnded) return { result: "ended", reason: problem.reason };
    throw problem;
  }
}

function search({ carrier, sentences, relations }: SearchTask, meter: Meter): SearchOutcome {
  const plans = sentences.map((sentence) => ({
    sentence,
    plan: planSentence(sentence, carrier.size === null),
  }));
  const deep: { readonly plan: Plan; readonly visits: number }[] = [];
  const solver = new Solver();
  const circuit = new Circuit(meter);
  const inputs = unknownTables(carrier, relations, circuit, meter);
  const clausifier = new Clausifier(circuit, solver, meter);
  const variables = relations.map(({ name }) =>
    inputs.get(name)!.map((input) => clausifier.variableOf(input)),
  );
  for (const { sentence, plan } of plans) {
    const visits = mostVisits(plan, carrier);
    if (visits > MOST_UNFOLDED) deep.push({ plan, visits });
    else {
      const reference = ground(carrier, sentence, inputs, circuit, meter);
      if (reference === FALSE) return { result: "none" };
      clausifier.assert(reference);
    }
  }
  breakSymmetry(carrier, relations, (relation, kind) => variables[relation]![kind]!, solver, meter);
  // The cheapest first: what it rules out need not be tried on the others.
  deep.sort((a, b) => a.visits - b.visits);
  for (;;) {
    const answer = solver.solve(meter);
    if (answer === "ended") return { result: "ended", reason: meter.ended ?? "budget" };
    if (answer === "unsatisfiable") return { result: "none" };
    const tables = tablesFrom(relations, variables, solver);
    const trial = new Trial(carrier, relations, tables, meter);
    const failing = deep.find(({ plan }) => !trial.isTrue(plan));
    if (failing === undefined) return { result: "found", structure: { carrier, tables } };
    solver.addClause(
      trial.entriesLookedAt().map(({ relation, kind, holds }) => {
        const variable = variables[relation]![kind]!;
        return holds ? -variable : variable;
      }),
    );
  }
}

function tablesFrom(
  relations: readonly RelationSymbol[],
  variables: readonly Int32Array[],
  solver: Solver,
): Structure["tables"] {
  const tables = new Map<string, Table>();
  for (const [index, relation] of relations.entries()) {
    const holds = Uint8Array.from(variables[index]!, (variable) => (solver.value(variable) ? 1 : 0));
    tables.set(relation.name, { relation, holds });
  }
  return tables;
}

/** An entry of a table: the relation by its number in the task. */
interface Entry {
  readonly relation: number;
  readonly kind: number;
  readonly holds: boolean;
}

/** What a sentence came to, and the entries that it came to it by: bit k of `because` is entry k. */
interface Outcome {
  readonly value: boolean;
  readonly because: bigint;
}

/**
 * Sentences tried on tables. With each value go entries such that the sentence has the same value in all tables that agree
 * on them.
 */
class Trial {
  readonly #carrier: Carrier;
  readonly #meter: Meter;
  readonly #entries: Entry[] = [];
  /** By the name of the relation: the number of its first entry, and its table. */
  readonly #tables = new Map<string, { readonly first: number; readonly holds: Uint8Array }>();
  #memory = new Memory<Outcome>();
  /** Of what was looked at last. */
  #because = 0n;

  constructor(
    carrier: Carrier,
    relations: readonly RelationSymbol[],
    tables: Structure["tables"],
    meter: Meter,
  ) {
    this.#carrier = carrier;
    this.#meter = meter;
    for (const [relation, { name }] of relations.entries()) {
      const { holds } = tables.get(name)!;
      this.#tables.set(name, { first: this.#entries.length, holds });
      holds.forEach((value, kind) => {
        this.#entries.push({ relation, kind, holds: value === 1 });
      });
    }
  }

  /** @throws WorkEnded */
  isTrue(plan: Plan): boolean {
    // Quantifiers are numbered within their sentence.
    this.#memory = new Memory();
    return this.#truth(plan, this.#carrier.empty);
  }

  /** The entries by which the sentence tried last has its value. */
  entriesLookedAt(): readonly Entry[] {
    return this.#entries.filter((_, number) => ((this.#because >> BigInt(number)) & 1n) === 1n);
  }

  #truth(node: Plan, configuration: unknown): boolean {
    this.#meter.charge(1);
    switch (node.kind) {
      case "true":
      case "false":
        this.#because = 0n;
        return node.kind === "true";
      case "atom": {
        const { first, holds } = this.#tables.get(node.relation.name)!;
        const kind = this.#carrier.kindOf(configuration, node.args);
        this.#because = 1n << BigInt(first + kind);
        return holds[kind] === 1;
      }
      case "equal":
        this.#because = 0n;
        return this.#carrier.same(configuration, node.left, node.right);
      case "not":
        return !this.#truth(node.body, configuration);
      case "and":
      case "or":
        return this.#first(node.parts, node.kind === "or", (part) => this.#truth(part, configuration));
      case "implies": {
        if (!this.#truth(node.first, configuration)) return true;
        const because = this.#because;
        const value = this.#truth(node.second, configuration);
        if (!value) this.#because |= because;
        return value;
      }
      case "iff": {
        const first = this.#truth(node.first, configuration);
        const because = this.#because;
        const second = this.#truth(node.second, configuration);
        this.#because |= because;
        return first === second;
      }
      case "forall":
      case "exists":
        return this.#quantified(node, configuration);
    }
  }

  /** Whether some part has the value that decides; else all parts are the reason. */
  #first<Part>(parts: readonly Part[], deciding: boolean, truth: (part: Part) => boolean): boolean {
    let because = 0n;
    for (const part of parts) {
      if (truth(part) === deciding) return deciding;
      because |= this.#because;
    }
    this.#because = because;
    return !deciding;
  }

  #quantified(node: QuantifierPlan, outer: unknown): boolean {
    const configuration = node.places === null ? outer : this.#carrier.restrict(outer, node.places);
    const key = node.recurs ? this.#carrier.key(configuration, node.toCome + 1) : null;
    const known = key === null ? undefined : this.#memory.get(node, key);
    if (known !== undefined) {
      this.#because = known.because;
      return known.value;
    }
    const extensions = listExtensions(this.#carrier, configuration, node.named, node.toCome, this.#meter);
    const value = this.#first(extensions, node.kind === "exists", (extended) =>
      this.#truth(node.body, extended),
    );
    if (key !== null) this.#memory.set(node, key, { value, because: this.#because });
    return value;
  }
}
