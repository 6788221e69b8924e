/**
 * From circuits to clauses, by definitions in one direction (Plaisted & Greenbaum 1986) or in both (Tseitin 1968).
 *
 * One direction is enough to ask whether there is a model and gives fewer clauses. Both directions make every
 * defined variable a function of the inputs, which counting needs.
 */
import type { Meter } from "../logic/meter.ts";
import { type Circuit, type ClauseSink, FALSE, type Reference, TRUE } from "./circuit.ts";

/** Clauses that are counted before the meter hears of them. */
const METERED_AT_ONCE = 1024;

export class Clausifier {
  readonly #circuit: Circuit;
  readonly #sink: ClauseSink;
  readonly #meter: Meter;
  readonly #bothWays: boolean;
  /** Clauses that the meter has not heard of yet. */
  #unmetered = 0;
  /** The variable of each input and of each gate that has been defined, by node; 0 where there is none yet. */
  #variables = new Int32Array(1024);
  /** Which directions a gate has been defined in: bit 1 from its variable to it, bit 2 from it to its variable. */
  readonly #defined = new Map<number, number>();

  /** @param meter counts a thousandth of a step for each clause */
  constructor(circuit: Circuit, sink: ClauseSink, meter: Meter, bothWays = false) {
    this.#circuit = circuit;
    this.#sink = sink;
    this.#meter = meter;
    this.#bothWays = bothWays;
  }

  /** The variable of an input, made when it is first asked for. */
  variableOf(input: Reference): number {
    if (input >= this.#variables.length) {
      const larger = new Int32Array(Math.max(input + 1, this.#variables.length * 2));
      larger.set(this.#variables);
      this.#variables = larger;
    }
    if (this.#variables[input] === 0) this.#variables[input] = this.#sink.newVariable();
    return this.#variables[input]!;
  }

  /**
   * Adds clauses that say that the reference is true.
   * @throws WorkEnded when the meter's budget ends or the user interrupts
   */
  assert(reference: Reference): void {
    const waiting: Reference[] = [reference];
    while (waiting.length > 0) {
      const next = waiting.pop()!;
      if (next === TRUE) continue;
      if (next > 0 && this.#circuit.isGate(next)) {
        const children = this.#circuit.childrenOf(next);
        for (let i = children.length - 1; i >= 0; i -= 1) waiting.push(children[i]!);
      } else this.#clause([], next);
    }
  }

  /** Adds the clause `literals ∨ reference`; a disjunction is opened into its parts. */
  #clause(literals: readonly number[], reference: Reference): void {
    const clause = [...literals];
    const open = [reference];
    while (open.length > 0) {
      const part = open.pop()!;
      if (part === FALSE) continue;
      if (part === TRUE) return;
      if (part < 0 && this.#circuit.isGate(part)) {
        const children = this.#circuit.childrenOf(-part);
        for (let i = children.length - 1; i >= 0; i -= 1) open.push(-children[i]!);
      } else clause.push(this.#literal(part));
    }
    this.#add(clause);
  }

  #add(clause: readonly number[]): void {
    this.#sink.addClause(clause);
    this.#unmetered += 1;
    if (this.#unmetered >= METERED_AT_ONCE) {
      this.#meter.charge(this.#unmetered);
      this.#unmetered = 0;
    }
  }

  /** A literal that stands for the reference, defined as far as it needs to be. */
  #literal(reference: Reference): number {
    const node = Math.abs(reference);
    if (!this.#circuit.isGate(node)) return reference > 0 ? this.variableOf(node) : -this.variableOf(node);
    this.#define(node, this.#bothWays ? 3 : reference > 0 ? 1 : 2);
    const variable = this.variableOf(node);
    return reference > 0 ? variable : -variable;
  }

  #define(gate: number, directions: number): void {
    const missing = directions & ~(this.#defined.get(gate) ?? 0);
    if (missing === 0) return;
    this.#defined.set(gate, (this.#defined.get(gate) ?? 0) | directions);
    const variable = this.variableOf(gate);
    const children = [...this.#circuit.childrenOf(gate)];
    if ((missing & 1) !== 0) for (const child of children) this.#clause([-variable], child);
    if ((missing & 2) !== 0) this.#add([variable, ...children.map((child) => this.#literal(-child))]);
  }
}
