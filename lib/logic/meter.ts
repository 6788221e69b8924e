/**
 * The measure of work. Budgets are counted in steps, never in seconds, so that a question has the same answer on
 * every machine. A step is one generated clause of a derivation, 1,000 literal visits of a propositional search, or
 * 1,000 visited nodes in grounding and evaluation; the meter counts thousandths of a step.
 */

/** Why work ended before it was done. */
export type EndReason = "budget" | "interrupted" | "memory";

/** Thrown by {@link Meter.charge} to unwind a deep recursion; caught by the question that set the budget. */
export class WorkEnded extends Error {
  readonly reason: EndReason;

  constructor(reason: EndReason) {
    super(`work ended: ${reason}`);
    this.reason = reason;
  }
}

export const DEFAULT_BUDGET = 200_000;

/** How far work has come. */
export interface Spent {
  /** Whole steps spent so far, a begun step counted as one. */
  readonly steps: number;
  /** Steps that may be spent; infinite for work that is bounded otherwise. */
  readonly limit: number;
}

/** Asked again and again while work goes on: whether the user has asked to stop. */
export type Poll = (spent: Spent) => boolean;

/** Thousandths of a step between two polls: seldom enough to cost nothing, often enough to be seen at once. */
const POLLED_EVERY = 1_000;

export class Meter implements Spent {
  readonly limit: number;
  /** Null while work may go on. */
  ended: EndReason | null = null;
  #thousandths = 0;
  /** What {@link #thousandths} must reach for the next poll. */
  #nextPoll = 0;
  readonly #isInterrupted: Poll;

  /**
   * @param limit steps that may be spent
   * @param isInterrupted asked at the first {@link spend} and about once in a step from then on
   */
  constructor(limit: number = DEFAULT_BUDGET, isInterrupted: Poll = () => false) {
    this.limit = limit;
    this.#isInterrupted = isInterrupted;
  }

  get steps(): number {
    return Math.min(this.limit, Math.ceil(this.#thousandths / 1000));
  }

  /** Thousandths of a step that are left. */
  get left(): number {
    return this.limit * 1000 - this.#thousandths;
  }

  /**
   * Counts work and tells whether it may go on. Call it at least once in every few thousand visits, so that an
   * interrupt is seen within 100 ms; with 0 it looks for an interrupt alone.
   */
  spend(thousandths: number): boolean {
    if (this.ended !== null) return false;
    this.#thousandths += thousandths;
    if (this.#thousandths > this.limit * 1000) this.ended = "budget";
    else if (thousandths === 0 || this.#thousandths >= this.#nextPoll) {
      this.#nextPoll = this.#thousandths + POLLED_EVERY;
      if (this.#isInterrupted(this)) this.ended = "interrupted";
    }
    return this.ended === null;
  }

  /** As {@link spend}, but throws {@link WorkEnded} instead of returning false. */
  charge(thousandths: number): void {
    if (!this.spend(thousandths)) throw new WorkEnded(this.ended!);
  }

  /** Ends the work because a bound on memory, counted in literals, was met. */
  endForMemory(): never {
    this.ended = "memory";
    throw new WorkEnded("memory");
  }
}
