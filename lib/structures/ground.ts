/** Grounding: a sentence over a carrier, unfolded to a circuit over the unknown entries of the tables. */
import type { Carrier } from "../carriers/carrier.ts";
import { countKinds, listExtensions } from "../carriers/listing.ts";
import type { Formula, RelationSymbol } from "../logic/formula.ts";
import type { Meter } from "../logic/meter.ts";
import { LARGEST_DOMAIN, LARGEST_TABLES } from "../logic/structure-definition.ts";
import { type Circuit, FALSE, type Reference, TRUE } from "./circuit.ts";
import { Memory, type Plan, planSentence, type QuantifierPlan } from "./plan.ts";

/** Visits that are counted before the meter hears of them. */
const METERED_AT_ONCE = 1024;

/** For each relation, the circuit's input for each kind of tuple: `inputs.get(name)[kind]`. */
export type UnknownTables = ReadonlyMap<string, Int32Array>;

/**
 * Makes one input for every entry of every table, relations in the order given, kinds in ascending order.
 * @throws WorkEnded when there would be too many
 */
export function unknownTables(
  carrier: Carrier,
  relations: readonly RelationSymbol[],
  circuit: Circuit,
  meter: Meter,
): UnknownTables {
  const entries = relations.reduce((sum, relation) => sum + countKinds(carrier, relation.places), 0);
  if (entries > LARGEST_TABLES || (carrier.size ?? 0) > LARGEST_DOMAIN) meter.endForMemory();
  const tables = new Map<string, Int32Array>();
  for (const relation of relations) {
    const inputs = new Int32Array(carrier.kindCount(relation.places));
    for (let kind = 0; kind < inputs.length; kind += 1) inputs[kind] = circuit.newInput();
    tables.set(relation.name, inputs);
  }
  return tables;
}

/**
 * The circuit that is true for exactly the tables in which the sentence holds.
 * @throws WorkEnded when the meter's budget ends, the user interrupts or memory runs out
 */
export function ground(
  carrier: Carrier,
  sentence: Formula,
  tables: UnknownTables,
  circuit: Circuit,
  meter: Meter,
): Reference {
  const memory = new Memory<Reference>();
  let unmetered = 0;
  const result = unfold(planSentence(sentence, carrier.size === null), carrier.empty);
  meter.charge(unmetered);
  return result;

  function unfold(node: Plan, configuration: unknown): Reference {
    unmetered += 1;
    if (unmetered >= METERED_AT_ONCE) {
      meter.charge(unmetered);
      unmetered = 0;
    }
    switch (node.kind) {
      case "true":
        return TRUE;
      case "false":
        return FALSE;
      case "atom":
        return tables.get(node.relation.name)![carrier.kindOf(configuration, node.args)]!;
      case "equal":
        return carrier.same(configuration, node.left, node.right) ? TRUE : FALSE;
      case "not":
        return -unfold(node.body, configuration);
      case "and":
        return junction(node.parts, configuration, 1);
      case "or":
        return junction(node.parts, configuration, -1);
      case "implies": {
        const first = unfold(node.first, configuration);
        return first === FALSE ? TRUE : circuit.or(-first, unfold(node.second, configuration));
      }
      case "iff": {
        const first = unfold(node.first, configuration);
        const second = unfold(node.second, configuration);
        return circuit.and(circuit.or(-first, second), circuit.or(first, -second));
      }
      case "forall":
      case "exists":
        return quantified(node, configuration);
    }
  }

  /** A conjunction, or with the sign −1 a disjunction, of the parts. */
  function junction(parts: readonly Plan[], configuration: unknown, sign: 1 | -1): Reference {
    const references: Reference[] = [];
    for (const part of parts) {
      const reference = sign * unfold(part, configuration);
      if (reference === FALSE) return sign * FALSE;
      references.push(reference);
    }
    return sign * circuit.conjunction(references);
  }

  function quantified(node: QuantifierPlan, outer: unknown): Reference {
    const configuration = node.places === null ? outer : carrier.restrict(outer, node.places);
    const key = node.recurs ? carrier.key(configuration, node.toCome + 1) : null;
    const known = key === null ? undefined : memory.get(node, key);
    if (known !== undefined) return known;
    const sign = node.kind === "forall" ? 1 : -1;
    const references: Reference[] = [];
    let result: Reference | null = null;
    for (const extended of listExtensions(carrier, configuration, node.named, node.toCome, meter)) {
      const reference = sign * unfold(node.body, extended);
      if (reference === FALSE) {
        result = sign * FALSE;
        break;
      }
      references.push(reference);
    }
    result ??= sign * circuit.conjunction(references);
    if (key !== null) memory.set(node, key, result);
    return result;
  }
}
