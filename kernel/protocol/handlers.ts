/** What the kernel does for each request: a table from message types to handlers. */
import type { CellEvent, CellOutcome, Evaluator } from "../session/evaluator.ts";
import type { History } from "./history.ts";
import { kernelInfo } from "./kernel-info.ts";
import type {
  ExpressionReply,
  PublicationContent,
  PublicationType,
  ReplyContent,
  ReplyType,
  RequestContent,
  RequestType,
} from "./messages.ts";

/** What handlers may use of the core. */
export interface Handling {
  readonly evaluator: Evaluator;
  readonly history: History;
  /** Cells counted so far. */
  executionCount: number;
  publish<T extends PublicationType>(type: T, content: PublicationContent<T>): void;
  /** Has execute requests that wait on shell answered with `aborted`. */
  abortWaiting(): void;
  shutDown(restart: boolean): void;
  log(line: string): void;
}

/** The type of the reply to a request; never for messages without one. */
type ReplyTo<T extends RequestType> = T extends `${infer Verb}_request`
  ? Extract<ReplyType, `${Verb}_reply`>
  : never;

type Handler<T extends RequestType> = (
  content: RequestContent<T>,
  handling: Handling,
) => Promise<[ReplyTo<T>] extends [never] ? null : ReplyContent<ReplyTo<T>>>;

const handlers: { readonly [T in RequestType]: Handler<T> } = {
  kernel_info_request: async () => kernelInfo,
  execute_request: execute,

  complete_request: async ({ code, cursor_pos }, { evaluator }) => {
    const { from, to, matches } = await evaluator.complete(code, clampCursor(code, cursor_pos));
    return {
      status: "ok",
      matches: matches.map((match) => match.text),
      cursor_start: from,
      cursor_end: to,
      // The key by which front ends learn the types of proposals, common practice among kernels.
      metadata: {
        _jupyter_types_experimental: matches.map(({ text, type }) => ({ start: from, end: to, text, type })),
      },
    };
  },

  inspect_request: async ({ code, cursor_pos, detail_level }, { evaluator }) => {
    const data = await evaluator.inspect(code, clampCursor(code, cursor_pos), detail_level);
    return { status: "ok", found: data !== null, data: data ?? {}, metadata: {} };
  },

  is_complete_request: async ({ code }, { evaluator }) => {
    const answer = await evaluator.isComplete(code);
    return answer.status === "incomplete"
      ? { status: answer.status, indent: answer.indent }
      : { status: answer.status };
  },

  history_request: async (query, { history }) => ({ status: "ok", history: history.query(query) }),

  // There are no comm targets, hence no comms.
  comm_info_request: async () => ({ status: "ok", comms: {} }),
  comm_open: async ({ comm_id, target_name }, { publish, log }) => {
    log(`comm_open for the unknown target ${target_name}`);
    publish("comm_close", { comm_id, data: {} });
    return null;
  },
  comm_msg: async ({ comm_id }, { log }) => {
    log(`comm_msg for the unknown comm ${comm_id} is ignored`);
    return null;
  },
  comm_close: async ({ comm_id }, { log }) => {
    log(`comm_close for the unknown comm ${comm_id} is ignored`);
    return null;
  },

  shutdown_request: async ({ restart }, { shutDown }) => {
    shutDown(restart);
    return { status: "ok", restart };
  },
  interrupt_request: async (_, { evaluator }) => {
    evaluator.interrupt();
    return { status: "ok" };
  },
  input_reply: async () => null,
};

/** Runs the handler of a request whose content has been checked. */
export async function runHandler<T extends RequestType>(
  type: T,
  content: RequestContent<T>,
  handling: Handling,
): Promise<Readonly<Record<string, unknown>> | null> {
  const reply = await handlers[type](content, handling);
  return reply === null ? null : { ...reply };
}

async function execute(
  request: RequestContent<"execute_request">,
  handling: Handling,
): Promise<ReplyContent<"execute_reply">> {
  const { code, silent } = request;
  const { evaluator, publish } = handling;
  if (request.store_history) handling.executionCount += 1;
  const execution_count = handling.executionCount;
  if (!silent) publish("execute_input", { code, execution_count });
  const outcome = await evaluator.runCell(code, (event) => {
    if (!silent) publishEvent(event, publish);
  });
  if (request.store_history && code.trim() !== "") {
    handling.history.append(execution_count, code, summarise(outcome));
  }
  if (outcome.status === "error") {
    const { ename, evalue, traceback } = outcome;
    if (!silent) publish("error", { ename, evalue, traceback });
    if (request.stop_on_error) handling.abortWaiting();
    return { status: "error", ename, evalue, traceback, execution_count };
  }
  const user_expressions = await evaluateAll(request.user_expressions, evaluator);
  return { status: "ok", execution_count, payload: [], user_expressions };
}

function publishEvent(event: CellEvent, publish: Handling["publish"]): void {
  if (event.kind === "stream") {
    publish("stream", { name: event.name, text: event.text });
    return;
  }
  publish(event.update ? "update_display_data" : "display_data", {
    data: event.data,
    metadata: event.metadata,
    transient: { display_id: event.displayId },
  });
}

/** What the history keeps of a cell's output. */
function summarise(outcome: CellOutcome): string | null {
  const lines = outcome.results.map((result) => result.summary);
  return lines.length === 0 ? null : lines.join("\n");
}

async function evaluateAll(
  expressions: Readonly<Record<string, string>>,
  evaluator: Evaluator,
): Promise<Record<string, ExpressionReply>> {
  const replies: [string, ExpressionReply][] = [];
  for (const [key, expression] of Object.entries(expressions)) {
    const outcome = await evaluator.evaluateExpression(expression);
    replies.push([
      key,
      outcome.status === "ok"
        ? { status: "ok", data: outcome.data, metadata: outcome.metadata }
        : {
            status: "error",
            ename: outcome.ename,
            evalue: outcome.evalue,
            traceback: outcome.traceback,
          },
    ]);
  }
  return Object.fromEntries(replies);
}

/** A cursor beyond the end counts as at the end; both in code points. */
function clampCursor(code: string, cursor: number): number {
  let length = 0;
  for (const _ of code) length++;
  return Math.min(cursor, length);
}
