/** The least conflicts between two restarts. */
const LEAST_CONFLICTS = 50;
/** Restart when recent clauses have this many times the levels of the average one. */
const MARGIN = 1.15;
/** Weights of the newest clause in the two moving averages. */
const FAST = 1 / 32;
const SLOW = 1 / 4096;

/**
 * When to give up the current decisions and begin anew from the top: when the clauses learned lately span clearly
 * more decision levels than usual (Audemard & Simon 2012), by exponential moving averages (Biere & Fröhlich 2015).
 */
export class Restarts {
  /** Moving averages of the number of levels of learned clauses. */
  #fast = 0;
  #slow = 0;
  /** Clauses seen in all; the averages are plain ones until there are enough. */
  #seen = 0;
  /** Conflicts since the last restart. */
  #since = 0;

  /** Takes note of a learned clause. */
  learned(levels: number): void {
    this.#seen += 1;
    this.#since += 1;
    this.#fast += (levels - this.#fast) * Math.max(FAST, 1 / this.#seen);
    this.#slow += (levels - this.#slow) * Math.max(SLOW, 1 / this.#seen);
  }

  /** Whether now is the time. */
  isDue(): boolean {
    return this.#since >= LEAST_CONFLICTS && this.#fast > MARGIN * this.#slow;
  }

  /** Takes note of a restart. */
  restarted(): void {
    this.#since = 0;
  }
}
