/** What a stored result says of infinite structures and of finite ones that do not exist, held against its evidence. */
import type { AnyStructure } from "../../lib/carriers/any-structure.ts";
import { buildCarrier } from "../../lib/carriers/build.ts";
import type { Structure, Table } from "../../lib/carriers/structure.ts";
import type { Evidence, Fact, StructureRecord } from "../../lib/evidence/format.ts";
import { formulaOf } from "../../lib/inquiry/finiteness/reason.ts";
import type { RelationSymbol } from "../../lib/logic/formula.ts";
import type { PrincipleRecord } from "../../lib/logic/records/finiteness.ts";
import { reasonData } from "../display/reasons.ts";
import { infiniteData } from "../display/structures.ts";

/**
 * Why the infinite structure or the reason that is stored is not the one of the evidence, or null.
 * @param relations those of the sentences that were asked about
 */
export function findOtherInfinite(
  data: Readonly<Record<string, unknown>>,
  { facts }: Evidence,
  relations: readonly RelationSymbol[],
): string | null {
  const symbols = new Map(relations.map((relation) => [relation.name, relation]));
  const { infiniteModel, reason } = data;
  if (infiniteModel !== undefined) {
    const shown = facts.flatMap((fact) => structureOf(fact, symbols) ?? []);
    if (!shown.some((structure) => infiniteData(structure).infiniteModel === infiniteModel))
      return "the infinite structure that is stored is none of those in the evidence";
  }
  if (reason !== undefined) {
    const stored = textOf(reason);
    const isShown = facts.some(
      (fact) =>
        fact.fact === "no-finite-model" && textOf(dataOfPrinciple(fact.principle, symbols)) === stored,
    );
    if (!isShown) return "the stored reason why there is no finite model is not the one in the evidence";
  }
  return null;
}

/** The structure of a fact; null when it has none. */
function structureOf(fact: Fact, symbols: ReadonlyMap<string, RelationSymbol>): AnyStructure | null {
  if (fact.fact === "terms") return { terms: fact.terms, certificates: fact.certificates };
  return fact.fact === "structure" ? built(fact.structure, symbols) : null;
}

function built(record: StructureRecord, symbols: ReadonlyMap<string, RelationSymbol>): Structure {
  const carrier = buildCarrier(record.carrier);
  const tables = new Map<string, Table>();
  for (const [name, { places, holds: kinds }] of Object.entries(record.tables)) {
    const holds = new Uint8Array(carrier.kindCount(places));
    for (const kind of kinds) holds[kind] = 1;
    tables.set(name, { relation: symbols.get(name) ?? { name, places, infix: false }, holds });
  }
  return { carrier, tables };
}

function dataOfPrinciple(
  record: PrincipleRecord,
  symbols: ReadonlyMap<string, RelationSymbol>,
): Readonly<Record<string, unknown>> {
  const { parameters, given, domain, relation } = record;
  return reasonData({
    record,
    parameters,
    given: given === null ? null : formulaOf(given, symbols),
    domain: formulaOf(domain, symbols),
    relation: formulaOf(relation, symbols),
  });
}

/** JSON text that does not depend on the order of keys, which front ends change. */
function textOf(value: unknown): string {
  return JSON.stringify(value, (_, part: unknown) =>
    typeof part === "object" && part !== null && !Array.isArray(part)
      ? Object.fromEntries(Object.entries(part).sort(([one], [other]) => (one < other ? -1 : 1)))
      : part,
  );
}
