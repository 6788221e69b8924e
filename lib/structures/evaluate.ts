/** Truth of sentences in structures, by walking over the carrier's extensions. */
import { listExtensions } from "../carriers/listing.ts";
import type { Structure } from "../carriers/structure.ts";
import type { Formula } from "../logic/formula.ts";
import type { Meter } from "../logic/meter.ts";
import { Memory, type Plan, planSentence, type QuantifierPlan } from "./plan.ts";

/** Visits that are counted before the meter hears of them. */
const METERED_AT_ONCE = 1024;

/**
 * Whether a sentence is true in a structure that interprets all its relations.
 * @param meter counts a thousandth of a step for each subformula looked at
 * @throws WorkEnded when the meter's budget ends or the user interrupts
 */
export function satisfies(structure: Structure, sentence: Formula, meter: Meter): boolean {
  const { carrier, tables } = structure;
  const memory = new Memory<boolean>();
  let unmetered = 0;
  const result = truth(planSentence(sentence, carrier.size === null), carrier.empty);
  meter.charge(unmetered);
  return result;

  function truth(node: Plan, configuration: unknown): boolean {
    unmetered += 1;
    if (unmetered >= METERED_AT_ONCE) {
      meter.charge(unmetered);
      unmetered = 0;
    }
    switch (node.kind) {
      case "true":
        return true;
      case "false":
        return false;
      case "atom": {
        const table = tables.get(node.relation.name);
        if (table === undefined || table.relation.places !== node.relation.places)
          throw new Error(`the structure does not interpret ${node.relation.name}`);
        return table.holds[carrier.kindOf(configuration, node.args)] === 1;
      }
      case "equal":
        return carrier.same(configuration, node.left, node.right);
      case "not":
        return !truth(node.body, configuration);
      case "and":
        return node.parts.every((part) => truth(part, configuration));
      case "or":
        return node.parts.some((part) => truth(part, configuration));
      case "implies":
        return !truth(node.first, configuration) || truth(node.second, configuration);
      case "iff":
        return truth(node.first, configuration) === truth(node.second, configuration);
      case "forall":
      case "exists":
        return quantified(node, configuration);
    }
  }

  function quantified(node: QuantifierPlan, outer: unknown): boolean {
    const configuration = node.places === null ? outer : carrier.restrict(outer, node.places);
    const key = node.recurs ? carrier.key(configuration, node.toCome + 1) : null;
    const known = key === null ? undefined : memory.get(node, key);
    if (known !== undefined) return known;
    const extensions = listExtensions(carrier, configuration, node.named, node.toCome, meter);
    const result =
      node.kind === "forall"
        ? extensions.every((extended) => truth(node.body, extended))
        : extensions.some((extended) => truth(node.body, extended));
    if (key !== null) memory.set(node, key, result);
    return result;
  }
}

/** Whether all sentences are true in the structure. */
export function satisfiesAll(structure: Structure, sentences: readonly Formula[], meter: Meter): boolean {
  return sentences.every((sentence) => satisfies(structure, sentence, meter));
}
