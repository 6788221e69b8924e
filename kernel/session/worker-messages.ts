/** What the two threads of a kernel say to each other: plain data. */
import type { CellEvent, Evaluator } from "./evaluator.ts";

/** The methods of an evaluator that are called in the worker. */
export type WorkerMethod = "runCell" | "evaluateExpression" | "complete" | "inspect" | "isComplete" | "reset";

/** To the worker: call a method. Calls are sent one at a time, each after the answer to the one before. */
export interface WorkerCall {
  readonly id: number;
  readonly method: WorkerMethod;
  /** The method's arguments, without the function of `runCell`. */
  readonly parameters: readonly unknown[];
}

/** From the worker. */
export type WorkerReport =
  | { readonly kind: "ready" }
  /** Something that the running cell shows. */
  | { readonly kind: "event"; readonly id: number; readonly event: CellEvent }
  /** What the method returned. */
  | { readonly kind: "value"; readonly id: number; readonly value: unknown }
  /** The method threw, which is a mistake of ours. */
  | { readonly kind: "failure"; readonly id: number; readonly message: string; readonly stack: string };

/** What a worker is started with. */
export interface WorkerStart {
  /** One 32-bit integer, 1 while an interrupt is asked for; searches poll it. */
  readonly interruptFlag: SharedArrayBuffer;
  /** The URL of the worker's own file, for the loader of sources. */
  readonly entry: string;
}

/** What the worker makes its evaluator from. */
export type EvaluatorClass = new (options: { isInterrupted: () => boolean }) => Evaluator;
