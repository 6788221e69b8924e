/** What a stored result says of infinite structures and of finite ones that do not exist, held against its evidence. */
import type { AnyStructure } from "../../lib/carriers/any-structure.ts";
import { buildCarrier } from "../../lib/carriers/build.ts";
import type { Carrier } from "../../lib/carriers/carrier.ts";
import type { Structure, Table } from "../../lib/carriers/structure.ts";
import type { Evidence, Fact, FormulaRecord, StructureRecord } from "../../lib/evidence/format.ts";
import { formulaOf } from "../../lib/inquiry/finiteness/reason.ts";
import type { RelationSymbol } from "../../lib/logic/formula.ts";
import type { PrincipleRecord } from "../../lib/logic/records/finiteness.ts";
import { Growth, visitAtoms } from "../../lib/logic/records/formulas.ts";
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
  const shown = facts.flatMap((fact) => structureOf(fact, symbols) ?? []);
  // Where no finite structure settled the question, the infinite one that did is told.
  const isTold = SIZES.some((key) => data[key] === null) && shown.length > 0;
  if (
    infiniteModel === undefined
      ? isTold
      : !shown.some((one) => infiniteData(one).infiniteModel === infiniteModel)
  )
    return "the infinite structure that is stored is none of those in the evidence";
  const principles = facts.flatMap((fact) => (fact.fact === "no-finite-model" ? [fact.principle] : []));
  const stored = textOf(reason);
  const isOwn =
    reason === undefined
      ? principles.length === 0
      : principles.some((principle) => textOf(dataOfPrinciple(principle, symbols)) === stored);
  return isOwn ? null : "the stored reason why there is no finite model is not the one in the evidence";
}

/** Keys of data that give the size of the structure that settled a question, null for an infinite one. */
const SIZES = ["modelSize", "countermodelSize", "separatingSize"];

/** The infinite structure of a fact; null when it has none. */
function structureOf(fact: Fact, symbols: ReadonlyMap<string, RelationSymbol>): AnyStructure | null {
  if (fact.fact === "terms") return { terms: fact.terms, certificates: fact.certificates };
  if (fact.fact !== "structure") return null;
  const carrier = buildCarrier(fact.structure.carrier);
  return carrier.size === null ? built(carrier, fact.structure, symbols) : null;
}

function built(
  carrier: Carrier,
  record: StructureRecord,
  symbols: ReadonlyMap<string, RelationSymbol>,
): Structure {
  const tables = new Map<string, Table>();
  for (const [name, { places, holds: kinds }] of Object.entries(record.tables)) {
    const holds = new Uint8Array(carrier.kindCount(places));
    for (const kind of kinds) holds[kind] = 1;
    tables.set(name, { relation: symbols.get(name) ?? { name, places, infix: false }, holds });
  }
  return { carrier, tables };
}

const TRUTH: FormulaRecord = ["true"];

function dataOfPrinciple(
  record: PrincipleRecord,
  symbols: ReadonlyMap<string, RelationSymbol>,
): Readonly<Record<string, unknown>> {
  const { parameters, given, domain, relation } = record;
  // It may speak of relations that the sentences do not have.
  const all = new Map(symbols);
  for (const formula of [given ?? TRUTH, domain, relation])
    visitAtoms(formula, new Growth(), (atom) => {
      const [kind, name] = atom;
      if (kind === "is" && !all.has(name)) all.set(name, { name, places: atom.length - 2, infix: false });
    });
  return reasonData({
    record,
    parameters,
    given: given === null ? null : formulaOf(given, all),
    domain: formulaOf(domain, all),
    relation: formulaOf(relation, all),
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
