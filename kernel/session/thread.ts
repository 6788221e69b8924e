/**
 * An evaluator whose cells run in a worker thread, so that the thread of the sockets stays free and an interrupt is
 * seen at once. If the worker dies, the running cell ends with an error that says so, and a new worker gets the
 * definitions that earlier cells made.
 */
import { Worker } from "node:worker_threads";
import type {
  CellEvent,
  CellOutcome,
  Completeness,
  Completion,
  Evaluator,
  ExpressionOutcome,
  MimeBundle,
  StatementResult,
} from "./evaluator.ts";
import { DefinitionLog, isDefinition } from "./thread-definitions.ts";
import type { WorkerCall, WorkerMethod, WorkerReport, WorkerStart } from "./worker-messages.ts";

export interface ThreadOptions {
  /** The worker's file; by default the one beside this file, which runs the session. */
  readonly entry?: URL;
  /** How long an interrupted call may go on before its worker is ended, in milliseconds. */
  readonly interruptGrace?: number;
  /** The bound of the worker's heap, in megabytes. */
  readonly heap?: number;
}

const DEFAULT_GRACE_MS = 5_000;
const DEFAULT_HEAP_MB = 2_048;

/** The worker has ended while it owed an answer. */
class WorkerLost extends Error {}
/** The evaluator was closed while a call was running or waiting. */
class EvaluatorClosed extends Error {}

/** A call that the worker owes the answer to. */
interface Running {
  readonly id: number;
  readonly show: (event: CellEvent) => void;
  readonly resolve: (value: unknown) => void;
  readonly reject: (error: Error) => void;
}

export class ThreadEvaluator implements Evaluator {
  readonly #entry: URL;
  readonly #grace: number;
  readonly #heap: number;
  readonly #flag = new Int32Array(new SharedArrayBuffer(4));
  #worker: Worker | null = null;
  #running: Running | null = null;
  #calls = 0;
  /** Ends when all calls so far have been answered. */
  #last: Promise<unknown> = Promise.resolve();
  #closed = false;
  #graceTimer: NodeJS.Timeout | null = null;
  /** What was being done when the worker was ended on purpose; null when it was not. */
  #endedFor: string | null = null;
  readonly #definitions = new DefinitionLog();
  #rebuilding = false;

  constructor(options: ThreadOptions = {}) {
    this.#entry = options.entry ?? ownWorker();
    this.#grace = options.interruptGrace ?? DEFAULT_GRACE_MS;
    this.#heap = options.heap ?? DEFAULT_HEAP_MB;
    // Started before it is needed: loading takes longer than most cells.
    this.#start();
  }

  runCell(code: string, show: (event: CellEvent) => void): Promise<CellOutcome> {
    return this.#inTurn(async () => {
      const shown: StatementResult[] = [];
      try {
        const outcome = (await this.#call("runCell", [code], (event) => {
          shown.push(...definitionsIn(event));
          show(event);
        })) as CellOutcome;
        this.#definitions.add(outcome.results);
        return outcome;
      } catch (error) {
        if (error instanceof EvaluatorClosed) return failedCell("Interrupted", error.message, []);
        if (!(error instanceof WorkerLost)) throw error;
        this.#definitions.add(shown);
        return failedCell("InternalError", `${error.message}; ${await this.#rebuild()}`, shown);
      }
    });
  }

  evaluateExpression(expression: string): Promise<ExpressionOutcome> {
    return this.#inTurn(async () => {
      try {
        return (await this.#callAndRebuild("evaluateExpression", [expression])) as ExpressionOutcome;
      } catch (error) {
        const { message } = error as Error;
        return { status: "error", ename: "InternalError", evalue: message, traceback: [message] };
      }
    });
  }

  complete(code: string, cursor: number): Promise<Completion> {
    return this.#inTurn(() => this.#callAndRebuild("complete", [code, cursor]) as Promise<Completion>);
  }

  inspect(code: string, cursor: number, detail: 0 | 1): Promise<MimeBundle | null> {
    return this.#inTurn(
      () => this.#callAndRebuild("inspect", [code, cursor, detail]) as Promise<MimeBundle | null>,
    );
  }

  isComplete(code: string): Promise<Completeness> {
    return this.#inTurn(() => this.#callAndRebuild("isComplete", [code]) as Promise<Completeness>);
  }

  reset(): Promise<void> {
    return this.#inTurn(async () => {
      this.#definitions.clear();
      await this.#callAndRebuild("reset", []);
    });
  }

  interrupt(): void {
    // What is rebuilt after a loss is not the user's to stop: definitions would be lost.
    if (this.#running === null || this.#rebuilding) return;
    Atomics.store(this.#flag, 0, 1);
    // The last resort, for work that does not poll the flag.
    this.#graceTimer ??= setTimeout(() => {
      this.#graceTimer = null;
      this.#end(`it did not stop within ${this.#grace} ms of the interrupt`);
    }, this.#grace);
  }

  async close(): Promise<void> {
    this.#closed = true;
    const worker = this.#worker;
    this.#worker = null;
    this.#settle()?.reject(new EvaluatorClosed("the kernel was shut down while this ran"));
    await worker?.terminate();
  }

  /** Runs work after everything before it; a rejection is the caller's and does not stop what follows. */
  #inTurn<T>(work: () => Promise<T>): Promise<T> {
    const result = this.#last.then(work);
    this.#last = result.catch(() => undefined);
    return result;
  }

  /** Ends the worker; the running call is rejected when it is gone. */
  #end(reason: string): void {
    this.#endedFor = reason;
    void this.#worker?.terminate();
  }

  #start(): Worker {
    const start: WorkerStart = {
      interruptFlag: this.#flag.buffer as SharedArrayBuffer,
      entry: this.#entry.href,
    };
    const isSource = this.#entry.pathname.endsWith(".ts");
    const worker = new Worker(isSource ? new URL("./worker-sources.mjs", import.meta.url) : this.#entry, {
      workerData: start,
      resourceLimits: { maxOldGenerationSizeMb: this.#heap },
      // Those of the main thread may name a loader that does not work in others.
      execArgv: [],
    });
    let reason = "";
    worker.on("message", (report: WorkerReport) => this.#take(report));
    worker.on("error", (error: Error & { code?: string }) => {
      reason =
        error.code === "ERR_WORKER_OUT_OF_MEMORY"
          ? `it was out of memory (its bound is ${this.#heap} MB)`
          : `it failed with ${error.message}`;
    });
    worker.on("exit", (code) => {
      if (this.#worker !== worker) return;
      this.#worker = null;
      const why = this.#endedFor ?? (reason === "" ? `it exited with status ${code}` : reason);
      this.#endedFor = null;
      this.#settle()?.reject(new WorkerLost(`the thread that runs the cells has ended: ${why}`));
    });
    this.#worker = worker;
    return worker;
  }

  #take(report: WorkerReport): void {
    const running = this.#running;
    if (report.kind === "ready" || running === null || report.id !== running.id) return;
    if (report.kind === "event") running.show(report.event);
    else if (report.kind === "value") this.#settle()?.resolve(report.value);
    else {
      const error = new Error(report.message);
      error.stack = report.stack;
      this.#settle()?.reject(error);
    }
  }

  /** The running call, which is running no longer. */
  #settle(): Running | null {
    const running = this.#running;
    this.#running = null;
    if (this.#graceTimer !== null) clearTimeout(this.#graceTimer);
    this.#graceTimer = null;
    return running;
  }

  /** Calls a method in the worker; no other call may be running. */
  #call(
    method: WorkerMethod,
    parameters: readonly unknown[],
    show: (event: CellEvent) => void = () => undefined,
  ): Promise<unknown> {
    if (this.#closed) return Promise.reject(new EvaluatorClosed("the kernel was shut down"));
    // Cleared here and not in the worker: an interrupt that comes before the worker has begun must count.
    Atomics.store(this.#flag, 0, 0);
    const worker = this.#worker ?? this.#start();
    const id = ++this.#calls;
    return new Promise((resolve, reject) => {
      this.#running = { id, show, resolve, reject };
      const call: WorkerCall = { id, method, parameters };
      worker.postMessage(call);
    });
  }

  /** As {@link #call}; if the worker is lost, the definitions are rebuilt before the error is passed on. */
  async #callAndRebuild(method: WorkerMethod, parameters: readonly unknown[]): Promise<unknown> {
    try {
      return await this.#call(method, parameters);
    } catch (error) {
      if (error instanceof WorkerLost) await this.#rebuild();
      throw error;
    }
  }

  /**
   * Gives a new worker the definitions of earlier cells, in their order. One that ends the worker again, or fails, is
   * left out.
   * @returns what was kept and what was lost, in words
   */
  async #rebuild(): Promise<string> {
    this.#rebuilding = true;
    for (let begun = 0; begun < this.#definitions.texts.length && !this.#closed; ) {
      const text = this.#definitions.texts[begun]!;
      try {
        const outcome = (await this.#call("runCell", [text])) as CellOutcome;
        if (outcome.status === "ok") begun += 1;
        else this.#definitions.drop(begun);
      } catch (error) {
        this.#definitions.drop(begun);
        // The new worker is lost too: begin again with one definition less.
        if (error instanceof WorkerLost) begun = 0;
      }
    }
    this.#rebuilding = false;
    return this.#definitions.describeLoss();
  }
}

function failedCell(ename: string, evalue: string, results: readonly StatementResult[]): CellOutcome {
  return { status: "error", ename, evalue, traceback: [`${ename}: ${evalue}`], results };
}

/** The definitions that a display reports, as far as it does. */
function definitionsIn(event: CellEvent): StatementResult[] {
  if (event.kind !== "display") return [];
  const result = event.metadata.twoplace as Partial<StatementResult> | undefined;
  return isDefinition(result) ? [result] : [];
}

/** The worker's file stands beside this one, as TypeScript in the sources and as JavaScript when bundled. */
function ownWorker(): URL {
  return new URL(import.meta.url.endsWith(".ts") ? "./worker.ts" : "./worker.js", import.meta.url);
}
