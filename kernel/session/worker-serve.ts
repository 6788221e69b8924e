/** The worker's side: calls come in, an evaluator in this thread answers them. */
import { parentPort, workerData } from "node:worker_threads";
import type { CellEvent, Evaluator } from "./evaluator.ts";
import type { EvaluatorClass, WorkerCall, WorkerReport, WorkerStart } from "./worker-messages.ts";

/** Makes an evaluator and has it answer the calls of the thread that started this one. */
export function serveEvaluator(make: EvaluatorClass): void {
  const port = parentPort;
  if (port === null) throw new Error("this file runs in a worker thread only");
  const flag = new Int32Array((workerData as WorkerStart).interruptFlag);
  const evaluator = new make({ isInterrupted: () => Atomics.load(flag, 0) !== 0 });
  const report = (what: WorkerReport): void => port.postMessage(what);

  port.on("message", async (call: WorkerCall) => {
    const { id } = call;
    try {
      const value = await answer(evaluator, call, (event) => report({ kind: "event", id, event }));
      report({ kind: "value", id, value });
    } catch (error) {
      const { message, stack } = error instanceof Error ? error : new Error(String(error));
      report({ kind: "failure", id, message, stack: stack ?? "" });
    }
  });
  report({ kind: "ready" });
}

function answer(evaluator: Evaluator, call: WorkerCall, show: (event: CellEvent) => void): Promise<unknown> {
  const [first, second, third] = call.parameters;
  switch (call.method) {
    case "runCell":
      return evaluator.runCell(first as string, show);
    case "evaluateExpression":
      return evaluator.evaluateExpression(first as string);
    case "complete":
      return evaluator.complete(first as string, second as number);
    case "inspect":
      return evaluator.inspect(first as string, second as number, third as 0 | 1);
    case "isComplete":
      return evaluator.isComplete(first as string);
    case "reset":
      return evaluator.reset();
  }
}
