/**
 * What the kernel's core asks of the part that runs cells. The core speaks the protocol and knows nothing of
 * theories; an evaluator knows nothing of messages. There is one evaluator for each kernel, in a worker thread of
 * its own, and a second implementation in the caller's thread for tests and `eval`.
 */
import type { Evidence } from "../../lib/evidence/format.ts";
import type { Diagnostic } from "../../lib/language/diagnostics.ts";

/** A value in several MIME types, the richest last in no particular order. */
export type MimeBundle = Readonly<Record<string, string>>;

/** What `eval --json` prints for a statement; see the README for the keys of `data`. */
export interface StatementResult {
  readonly statement: string;
  readonly text: string;
  readonly verdict: string | null;
  readonly summary: string;
  readonly steps: number;
  readonly data: Readonly<Record<string, unknown>>;
  readonly evidence: Evidence | null;
  readonly diagnostics: readonly Diagnostic[];
}

/** What a running cell shows, in order. All of it is plain data that can be sent to another thread. */
export type CellEvent =
  | {
      readonly kind: "display";
      /** Same for a progress display and the result that overwrites it; unique in a session. */
      readonly displayId: string;
      /** Whether this display takes the place of an earlier one with the same id. */
      readonly update: boolean;
      readonly data: MimeBundle;
      /** Under the key `twoplace`: the statement's result with its evidence. */
      readonly metadata: Readonly<Record<string, unknown>>;
    }
  | { readonly kind: "stream"; readonly name: "stdout" | "stderr"; readonly text: string };

/** How a cell ended. */
export type CellOutcome =
  | { readonly status: "ok"; readonly results: readonly StatementResult[] }
  | {
      readonly status: "error";
      /** `Mistakes`, `FailedClaims`, `Interrupted` or `InternalError`. */
      readonly ename: string;
      readonly evalue: string;
      /** Lines for people; shows the cell's line and a caret where a place is known. */
      readonly traceback: readonly string[];
      readonly results: readonly StatementResult[];
    };

/** The value of one entry of `user_expressions`. */
export type ExpressionOutcome =
  | { readonly status: "ok"; readonly data: MimeBundle; readonly metadata: Readonly<Record<string, unknown>> }
  | {
      readonly status: "error";
      readonly ename: string;
      readonly evalue: string;
      readonly traceback: readonly string[];
    };

/** A proposal of completion; places are in code points. */
export interface Completion {
  readonly from: number;
  readonly to: number;
  readonly matches: readonly { readonly text: string; readonly type: string }[];
}

export type Completeness =
  | { readonly status: "complete" | "invalid" | "unknown" }
  | { readonly status: "incomplete"; readonly indent: string };

export interface Evaluator {
  /**
   * Runs a cell. Definitions made before an error or an interrupt survive. Never rejects for a mistake of the
   * user's; calls are run one after another.
   */
  runCell(code: string, show: (event: CellEvent) => void): Promise<CellOutcome>;
  /** Evaluates an expression for prose, such as the name of a definition, without changing anything. */
  evaluateExpression(expression: string): Promise<ExpressionOutcome>;
  complete(code: string, cursor: number): Promise<Completion>;
  /** The bundle that explains what stands at the cursor; null when there is nothing to say. */
  inspect(code: string, cursor: number, detail: 0 | 1): Promise<MimeBundle | null>;
  isComplete(code: string): Promise<Completeness>;
  /** Asks the running cell to stop within 100 ms; harmless when none runs. */
  interrupt(): void;
  /** Forgets all definitions and claims. */
  reset(): Promise<void>;
  /** Ends the thread; the evaluator is of no use afterwards. */
  close(): Promise<void>;
}
