/**
 * The kernel without a transport: requests go in, replies and publications come out. It speaks the protocol and knows
 * nothing of theories; the evaluator runs the cells.
 *
 * - Requests on `shell` are answered one after another, in order. Those on `control` have a queue of their own and are
 *   never behind them.
 * - Every request is wrapped in `status: busy` … `status: idle`, and idle comes last.
 * - Whatever a client sends, the kernel lives on: a request that can be read is answered, if only with an error; what
 *   cannot be answered is given back to the transport as a problem.
 */

import { v4 as uuid } from "uuid";
import * as v from "valibot";
import type { Evaluator } from "../session/evaluator.ts";
import { type Handling, runHandler } from "./handlers.ts";
import { History } from "./history.ts";
import {
  type Channel,
  type Header,
  type Message,
  PROTOCOL_VERSION,
  type PublicationContent,
  type PublicationType,
  type RequestChannel,
  type RequestContent,
  type RequestType,
} from "./messages.ts";
import { describeIssues, isRequestType, messageSchema, requestChannels, requestContents } from "./schemas.ts";

export interface KernelCoreOptions {
  readonly evaluator: Evaluator;
  /** Sends a message to all clients; must not throw. */
  readonly publish: (message: Message) => void;
  /** Kept by the caller over restarts; without it, the core begins one. */
  readonly history?: History;
  /** A client has asked the kernel to end, or to end and be started again; the reply is already on its way. */
  readonly onShutdown?: (restart: boolean) => void;
  /** Takes what a developer may want to know; nothing by default. */
  readonly log?: (line: string) => void;
}

/** Takes one reply to the client that asked; must not throw. */
export type SendReply = (message: Message) => void;

/** A request that a queue holds. */
interface Pending {
  readonly header: Header;
  readonly channel: RequestChannel;
  readonly content: Readonly<Record<string, unknown>>;
  readonly sendReply: SendReply;
  /** Set when an earlier cell ended with an error and asked for it; looked at when the turn comes. */
  aborted: boolean;
}

/** After an error, requests already on their way get this long to arrive before the queue is aborted. */
const ON_THEIR_WAY_MS = 20;

export class KernelCore {
  /** The session in the headers of this kernel; a restarted kernel has another. */
  readonly session = uuid();
  readonly #options: KernelCoreOptions;
  readonly #history: History;
  readonly #queues: Record<RequestChannel, Pending[]> = { shell: [], control: [], stdin: [] };
  readonly #draining = new Set<RequestChannel>();
  #executionCount = 0;
  #abort = false;
  #closed = false;
  #busy = 0;

  constructor(options: KernelCoreOptions) {
    this.#options = options;
    this.#history = options.history ?? new History();
  }

  /** Whether a request is being answered. */
  get isBusy(): boolean {
    return this.#busy > 0;
  }

  /** Tells all clients that the kernel has started. */
  announce(): void {
    this.#publish("status", { execution_state: "starting" }, {});
  }

  /**
   * Takes a request in; returns at once. Nothing that a client can send makes it throw.
   * @param message as a transport read it, not checked
   * @param sendReply takes the replies to this request
   * @returns null, or in words why the message cannot even be answered
   */
  receive(message: unknown, sendReply: SendReply): string | null {
    const read = v.safeParse(messageSchema, message);
    if (!read.success) return describeIssues(read.issues, "");
    const { channel, header, content } = read.output;
    if (channel === "iopub") return "channel: clients do not send on iopub";
    if (this.#closed) return "the kernel has ended";
    this.#queues[channel].push({ header, channel, content, sendReply, aborted: false });
    void this.#drain(channel);
    return null;
  }

  /** Asks the running cell to stop. Requests that wait are not touched. */
  interrupt(): void {
    this.#options.evaluator.interrupt();
  }

  /** Ends the evaluator; a running cell ends with an error, and what waits is answered with `aborted` or an error. */
  async close(): Promise<void> {
    if (this.#closed) return;
    this.#closed = true;
    await this.#options.evaluator.close();
  }

  /** Works on a queue until it is empty; at most one such loop for each channel. */
  async #drain(channel: RequestChannel): Promise<void> {
    if (this.#draining.has(channel)) return;
    this.#draining.add(channel);
    const queue = this.#queues[channel];
    // A turn of the loop apart, so that `receive` returns before anything is sent.
    await Promise.resolve();
    for (let next = queue.shift(); next !== undefined; next = queue.shift()) {
      await this.#answer(next);
      if (this.#abort && channel === "shell") await this.#abortQueue(queue);
    }
    this.#draining.delete(channel);
  }

  async #abortQueue(queue: readonly Pending[]): Promise<void> {
    this.#abort = false;
    if (!this.#closed) await new Promise((resolve) => setTimeout(resolve, ON_THEIR_WAY_MS));
    for (const pending of queue) if (pending.header.msg_type === "execute_request") pending.aborted = true;
  }

  /** Busy, whatever the request brings about, the reply, idle. */
  async #answer(pending: Pending): Promise<void> {
    const { header, channel, sendReply } = pending;
    if (channel === "stdin") {
      // The kernel never asks for input, so an answer belongs to no question.
      this.#log(`${header.msg_type} on stdin is ignored`);
      return;
    }
    this.#busy += 1;
    this.#publish("status", { execution_state: "busy" }, header);
    const content = await this.#contentOfReply(pending);
    if (content !== null) {
      const type = header.msg_type.replace(/_request$/, "_reply");
      sendReply(this.#message(channel, type, content, header));
    }
    this.#busy -= 1;
    this.#publish("status", { execution_state: "idle" }, header);
  }

  /** The reply's content; null where a message has no reply. */
  async #contentOfReply(pending: Pending): Promise<Readonly<Record<string, unknown>> | null> {
    const { header, channel } = pending;
    const type = header.msg_type;
    const isRequest = type.endsWith("_request");
    const refuse = (ename: string, evalue: string): Readonly<Record<string, unknown>> | null => {
      this.#log(`${ename}: ${evalue}`);
      if (!isRequest) return null;
      const error = { status: "error", ename, evalue, traceback: [] };
      return type === "execute_request" ? { ...error, execution_count: this.#executionCount } : error;
    };
    if (!isRequestType(type)) return refuse("UnknownRequest", `the kernel knows no message ${type}`);
    if (!requestChannels[type].includes(channel)) {
      return refuse(
        "WrongChannel",
        `${type} belongs on ${requestChannels[type].join(" or ")}, not on ${channel}`,
      );
    }
    const read = v.safeParse(requestContents[type], pending.content);
    if (!read.success)
      return refuse("MalformedRequest", `${type}: ${describeIssues(read.issues, "content")}`);
    if (pending.aborted || (this.#closed && type === "execute_request")) {
      return { status: "aborted", execution_count: this.#executionCount };
    }
    if (this.#closed) return refuse("KernelEnded", "the kernel has ended");
    try {
      return await runHandler(type, read.output as RequestContent<RequestType>, this.#handlingOf(header));
    } catch (error) {
      // A mistake of ours; users' mistakes are values.
      this.#log(error instanceof Error ? String(error.stack) : String(error));
      return refuse("InternalError", error instanceof Error ? error.message : String(error));
    }
  }

  #handlingOf(parent: Header): Handling {
    const core = this;
    return {
      evaluator: this.#options.evaluator,
      history: this.#history,
      get executionCount() {
        return core.#executionCount;
      },
      set executionCount(count) {
        core.#executionCount = count;
      },
      publish: (type, content) => core.#publish(type, content, parent),
      abortWaiting: () => {
        core.#abort = true;
      },
      shutDown: (restart) => {
        // After the reply and the idle that end this request.
        setImmediate(() => core.#options.onShutdown?.(restart));
      },
      log: (line) => core.#log(line),
    };
  }

  #publish<T extends PublicationType>(
    type: T,
    content: PublicationContent<T>,
    parent: Header | Readonly<Record<string, never>>,
  ): void {
    this.#options.publish(this.#message("iopub", type, { ...content }, parent));
  }

  #message(
    channel: Channel,
    type: string,
    content: Readonly<Record<string, unknown>>,
    parent: Header | Readonly<Record<string, never>>,
  ): Message {
    const header = makeHeader(type, this.session, "kernel");
    return { channel, header, parent_header: parent, metadata: {}, content, buffers: [] };
  }

  #log(line: string): void {
    this.#options.log?.(line);
  }
}

/** A header with a new id and the present time. */
export function makeHeader(type: string, session: string, username: string): Header {
  return {
    msg_id: uuid(),
    msg_type: type,
    session,
    username,
    date: new Date().toISOString(),
    version: PROTOCOL_VERSION,
  };
}
