/** A session: the definitions and claims of one notebook, and everything that can be asked about them. */
import { randomUUID } from "node:crypto";
import { completeAt, inspectAt, isComplete } from "../../lib/language/completion.ts";
import { emptyScope } from "../../lib/language/statements.ts";
import { prepareDrawing } from "../display/drawing.ts";
import { showInspection } from "../display/inspection.ts";
import type {
  CellEvent,
  CellOutcome,
  Completeness,
  Completion,
  Evaluator,
  ExpressionOutcome,
  MimeBundle,
} from "./evaluator.ts";
import { evaluateProse } from "./prose.ts";
import { type Memory, runCell } from "./run-cell.ts";

export interface SessionOptions {
  /** Polled by searches; true asks the running cell to stop. */
  readonly isInterrupted: () => boolean;
  /** Milliseconds, for progress displays. */
  readonly clock?: () => number;
}

/** Runs cells in the caller's thread. */
export class Session implements Evaluator {
  readonly #isInterrupted: () => boolean;
  readonly #clock: () => number;
  #memory: Memory = newMemory();

  constructor(options: SessionOptions) {
    this.#isInterrupted = options.isInterrupted;
    this.#clock = options.clock ?? Date.now;
  }

  async runCell(code: string, show: (event: CellEvent) => void): Promise<CellOutcome> {
    await prepareDrawing();
    return runCell(code, this.#memory, { isInterrupted: this.#isInterrupted, show, clock: this.#clock });
  }

  async evaluateExpression(expression: string): Promise<ExpressionOutcome> {
    return evaluateProse(expression, this.#memory, this.#isInterrupted);
  }

  async complete(code: string, cursor: number): Promise<Completion> {
    return completeAt(code, cursor, this.#memory.scope);
  }

  async inspect(code: string, cursor: number, detail: 0 | 1): Promise<MimeBundle | null> {
    const found = inspectAt(code, cursor, this.#memory.scope);
    if (found === null) return null;
    await prepareDrawing();
    return showInspection(found, detail);
  }

  async isComplete(code: string): Promise<Completeness> {
    return isComplete(code);
  }

  /** Nothing to do: the caller's own `isInterrupted` is what is polled. */
  interrupt(): void {}

  async reset(): Promise<void> {
    this.#memory = newMemory();
  }

  async close(): Promise<void> {}
}

function newMemory(): Memory {
  const session = randomUUID();
  let displays = 0;
  return {
    scope: emptyScope,
    ledger: [],
    nextDisplayId: () => {
      displays += 1;
      return `${session}-${displays}`;
    },
  };
}
