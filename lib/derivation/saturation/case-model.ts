/**
 * The model of the names that splitting brings in (`splitting.ts`): a propositional solver finds values that make every
 * clause of names true, and the search goes on with the clauses all of whose names are false by them; the others are true
 * already, and frozen. What the search makes of a part in which some names hold has their negations; when nothing but
 * those is left, it is a clause of names, and there is another model or none.
 */
import { type Meter, WorkEnded } from "../../logic/meter.ts";
import type { CreateSolver, GroundSolver } from "../ground-solver.ts";
import { replay } from "../instantiation/replay.ts";
import { type ClauseStore, DELETED, FROZEN, PARKED } from "./clauses.ts";
import { atomOf, isNegative } from "./ordering.ts";
import type { Splitting } from "./splitting.ts";
import type { TermBank } from "./terms.ts";
import type { WorkClock } from "./work-clock.ts";

/** A step of the propositional refutation: a clause of names, and what it follows from by unit propagation. */
export interface CaseStep {
  /** Literals of names. */
  readonly literals: readonly number[];
  /** Clauses of names that the search found. */
  readonly clauses: readonly number[];
  /** Earlier steps. */
  readonly steps: readonly number[];
}

export class CaseModel {
  readonly #bank: TermBank;
  readonly #store: ClauseStore;
  readonly #splitting: Splitting;
  readonly #meter: Meter;
  readonly #clock: WorkClock;
  readonly #solver: GroundSolver;
  #variables = 0;
  /** What the solver was given, in its variables, each one more than the number of a name; and the same by clause. */
  readonly #given: (readonly number[])[] = [];
  readonly #clauses: number[] = [];
  readonly #learned: (readonly number[])[] = [];
  /** By variable; all others are false. */
  #values: readonly boolean[] = [];
  /** Whether some clause of names is false. */
  #isStale = false;
  /** Clauses with names and something else. */
  #conditional: number[] = [];
  /** Parked clauses, with the names of which all are false as long as it is superfluous. */
  #parked: { readonly clause: number; readonly names: readonly number[] }[] = [];
  /** Literals that it keeps. */
  size = 0;

  constructor(
    bank: TermBank,
    store: ClauseStore,
    splitting: Splitting,
    createSolver: CreateSolver,
    meter: Meter,
    clock: WorkClock,
  ) {
    this.#bank = bank;
    this.#store = store;
    this.#splitting = splitting;
    this.#meter = meter;
    this.#clock = clock;
    this.#solver = createSolver((clause) => {
      this.#learned.push([...clause]);
      this.size += clause.length;
    });
  }

  /** The names of a clause, which come last in it. */
  namesOf(clause: number): number[] {
    const names: number[] = [];
    for (let k = this.#store.length(clause) - 1; k >= 0; k -= 1) {
      const literal = this.#store.literal(clause, k);
      if (!this.#bank.isName[this.#bank.words[atomOf(literal)]!]) break;
      names.push(literal);
    }
    return names;
  }

  /** Takes account of a new clause that has names; a clause of nothing else is taken out of the search. */
  add(clause: number, names: readonly number[]): void {
    if (names.length < this.#store.length(clause)) {
      this.#conditional.push(clause);
      if (this.#isFrozen(clause)) this.#store.mark(clause, FROZEN);
      return;
    }
    this.#store.mark(clause, DELETED);
    const signed = names.map((name) => this.#signed(name));
    this.#given.push(signed);
    this.#clauses.push(clause);
    this.#solver.addClause(signed);
    this.size += signed.length;
    if (!names.some((name) => this.#isTrue(name))) this.#isStale = true;
  }

  #signed(name: number): number {
    const variable = this.#splitting.numberOf(name) + 1;
    for (; this.#variables < variable; this.#variables += 1) this.#solver.newVariable();
    return isNegative(name) ? -variable : variable;
  }

  #isTrue(name: number): boolean {
    return (this.#values[this.#splitting.numberOf(name) + 1] === true) !== isNegative(name);
  }

  #isFrozen(clause: number): boolean {
    for (let k = this.#store.length(clause) - 1; k >= 0; k -= 1) {
      const literal = this.#store.literal(clause, k);
      if (!this.#bank.isName[this.#bank.words[atomOf(literal)]!]) return false;
      if (this.#isTrue(literal)) return true;
    }
    return false;
  }

  /**
   * Takes a clause out that follows from others, of which some have names: for good if it has those too, and else until
   * the model changes in them.
   */
  remove(clause: number, names: readonly number[]): void {
    const own = this.namesOf(clause);
    const more = names.filter((name) => !own.includes(name));
    this.#store.mark(clause, more.length === 0 ? DELETED : PARKED);
    if (more.length === 0) return;
    this.#parked.push({ clause, names: more });
    this.size += more.length;
  }

  /**
   * Sees to a model of all clauses of names.
   * @returns null when there is none; else the clauses that take part again
   * @throws WorkEnded
   */
  update(): readonly number[] | null {
    if (!this.#isStale) return [];
    this.#isStale = false;
    const outcome = this.#solver.solve(this.#meter);
    if (outcome === "ended") throw new WorkEnded(this.#meter.ended!);
    if (outcome === "unsatisfiable") return null;
    this.#values = Array.from({ length: this.#variables + 1 }, (_, v) => v > 0 && this.#solver.value(v));
    return this.#change();
  }

  #change(): readonly number[] {
    const store = this.#store;
    const back: number[] = [];
    this.#clock.tick(this.#conditional.length + this.#parked.length);
    this.#conditional = this.#conditional.filter((clause) => !store.is(clause, DELETED));
    for (const clause of this.#conditional) {
      const isFrozen = this.#isFrozen(clause);
      if (isFrozen === store.is(clause, FROZEN)) continue;
      if (isFrozen) store.mark(clause, FROZEN);
      else {
        store.unmark(clause, FROZEN);
        back.push(clause);
      }
    }
    this.#parked = this.#parked.filter(({ clause, names }) => {
      if (!names.some((name) => this.#isTrue(name))) return true;
      store.unmark(clause, PARKED);
      back.push(clause);
      this.size -= names.length;
      return false;
    });
    return back;
  }

  /**
   * The refutation of the clauses of names; its last step has no literals.
   * @throws WorkEnded
   */
  refutation(): readonly CaseStep[] {
    const end = this.#learned.findIndex((clause) => clause.length === 0);
    if (end < 0) throw new Error("the solver has not told of the clauses that it derived");
    const steps = replay(this.#variables, this.#given, this.#learned.slice(0, end + 1), this.#meter);
    return steps.map(({ clause, given, steps: earlier }) => ({
      literals: clause.map((signed) => this.#splitting.literalOf(Math.abs(signed) - 1, signed < 0)),
      clauses: given.map((place) => this.#clauses[place]!),
      steps: earlier,
    }));
  }
}
