/** Truth of sentences in structures, by walking over the carrier's extensions. */
import type { Structure } from "../carriers/structure.ts";
import type { Formula } from "../logic/formula.ts";
import type { Meter } from "../logic/meter.ts";
import { enter, type Plan, planSentence } from "./plan.ts";

/** Visits that are counted before the meter hears of them. */
const METERED_AT_ONCE = 1024;

/**
 * Whether a sentence is true in a structure that interprets all its relations.
 * @throws WorkEnded when the meter's budget ends or the user interrupts
 */
export function satisfies(structure: Structure, sentence: Formula, meter: Meter): boolean {
  const { carrier, tables } = structure;
  const plan = planSentence(sentence);
  const memories = new Map<number, Map<string | number, boolean>>();
  let unmetered = 0;
  const result = truth(plan, carrier.empty);
  meter.charge(unmetered);
  return result;

  function truth(node: Plan, outer: unknown): boolean {
    unmetered += 1;
    if (unmetered >= METERED_AT_ONCE) {
      meter.charge(unmetered);
      unmetered = 0;
    }
    const configuration = enter(carrier, node, outer);
    if ((node.kind === "forall" || node.kind === "exists") && node.recurs)
      return remembered(node, configuration);
    return compute(node, configuration);
  }

  function remembered(node: Plan, configuration: unknown): boolean {
    let memory = memories.get(node.id);
    if (memory === undefined) {
      memory = new Map();
      memories.set(node.id, memory);
    }
    const key = carrier.key(configuration);
    let known = memory.get(key);
    if (known === undefined) {
      known = compute(node, configuration);
      memory.set(key, known);
    }
    return known;
  }

  function compute(node: Plan, configuration: unknown): boolean {
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
        return carrier.extensions(configuration, node.toCome).every((extended) => truth(node.body, extended));
      case "exists":
        return carrier.extensions(configuration, node.toCome).some((extended) => truth(node.body, extended));
    }
  }
}

/** Whether all sentences are true in the structure. */
export function satisfiesAll(structure: Structure, sentences: readonly Formula[], meter: Meter): boolean {
  return sentences.every((sentence) => satisfies(structure, sentence, meter));
}
