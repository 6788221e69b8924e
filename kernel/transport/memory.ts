/** A kernel and its clients in one process, with nothing between them: for `twoplace run` and for tests. */
import { v4 as uuid } from "uuid";
import type { CellReply, CellRunner } from "../notebook/execute.ts";
import type { Output } from "../notebook/nbformat.ts";
import { OutputCollector } from "../notebook/outputs.ts";
import { KernelCore, makeHeader } from "../protocol/core.ts";
import type { Channel, Message, ReplyContent, RequestChannel } from "../protocol/messages.ts";
import type { Evaluator } from "../session/evaluator.ts";

export interface MemoryKernelOptions {
  readonly evaluator: Evaluator;
  readonly onShutdown?: (restart: boolean) => void;
  readonly log?: (line: string) => void;
}

/** A kernel that clients in the same process connect to. A shutdown request ends it, whether or not to be restarted. */
export class MemoryKernel {
  readonly #core: KernelCore;
  readonly #connections = new Set<MemoryConnection>();

  constructor(options: MemoryKernelOptions) {
    this.#core = new KernelCore({
      ...options,
      onShutdown: (restart) => {
        options.onShutdown?.(restart);
        void this.close();
      },
      publish: (message) => {
        for (const connection of this.#connections) connection.deliver(message);
      },
    });
  }

  /** A new connection; it gets all that is published from now on, and the replies to what it sends. */
  connect(): MemoryConnection {
    const connection = new MemoryConnection(this.#core, () => this.#connections.delete(connection));
    this.#connections.add(connection);
    return connection;
  }

  interrupt(): void {
    this.#core.interrupt();
  }

  /** Ends the kernel with its evaluator. */
  close(): Promise<void> {
    return this.#core.close();
  }
}

/** One client's side: a queue of messages for each channel. */
export class MemoryConnection {
  readonly #core: KernelCore;
  readonly #disconnect: () => void;
  readonly #arrived = new Map<Channel, Message[]>();
  readonly #waiting = new Map<Channel, ((message: Message) => void)[]>();
  /** While set, takes every message that arrives; nothing is queued then. */
  onMessage: ((message: Message) => void) | null = null;

  constructor(core: KernelCore, disconnect: () => void) {
    this.#core = core;
    this.#disconnect = disconnect;
  }

  /**
   * Sends anything; what is no message is refused.
   * @returns null, or what makes the message impossible to answer
   */
  send(message: unknown): string | null {
    return this.#core.receive(message, (reply) => this.deliver(reply));
  }

  /** The next message of a channel, waited for if none is there. */
  next(channel: Channel): Promise<Message> {
    const first = this.#arrived.get(channel)?.shift();
    if (first !== undefined) return Promise.resolve(first);
    return new Promise((resolve) => {
      this.#waiting.set(channel, [...(this.#waiting.get(channel) ?? []), resolve]);
    });
  }

  /** Puts a message into its queue, or hands it to who waits for it. */
  deliver(message: Message): void {
    if (this.onMessage !== null) {
      this.onMessage(message);
      return;
    }
    const waiting = this.#waiting.get(message.channel)?.shift();
    if (waiting !== undefined) waiting(message);
    else this.#arrived.set(message.channel, [...(this.#arrived.get(message.channel) ?? []), message]);
  }

  /** Gets no more messages. */
  close(): void {
    this.#disconnect();
  }
}

/** What a request brought about. */
export interface Exchange {
  /** The reply's content. */
  readonly reply: Readonly<Record<string, unknown>>;
  /** What was published for it, from busy to idle. */
  readonly published: readonly Message[];
}

/** Options of `execute_request`; see `ExecuteRequest`. */
export interface ExecuteOptions {
  readonly silent?: boolean;
  readonly store_history?: boolean;
  readonly user_expressions?: Readonly<Record<string, string>>;
  readonly stop_on_error?: boolean;
}

interface Expected {
  published: Message[];
  reply: Message | null;
  idle: boolean;
  hasReply: boolean;
  resolve(exchange: Exchange): void;
}

/** A client that sends requests and waits until each is answered and the kernel idle again. */
export class MemoryClient implements CellRunner {
  readonly session = uuid();
  readonly #connection: MemoryConnection;
  readonly #expected = new Map<string, Expected>();
  readonly #collector = new OutputCollector();
  /** Told of every message that is sent or arrives. */
  onMessage: ((message: Message, direction: "sent" | "received") => void) | null = null;

  constructor(connection: MemoryConnection) {
    this.#connection = connection;
    connection.onMessage = (message) => this.#take(message);
  }

  /**
   * Sends a request.
   * @param hasReply whether one is to be waited for; else the exchange is over when the kernel is idle, and its reply
   *   is empty
   * @returns rejects if the kernel refuses the message, or has ended
   */
  request(
    type: string,
    content: Readonly<Record<string, unknown>> = {},
    channel: RequestChannel = "shell",
    hasReply = type.endsWith("_request"),
  ): Promise<Exchange> {
    const header = makeHeader(type, this.session, "client");
    const message: Message = { channel, header, parent_header: {}, metadata: {}, content, buffers: [] };
    return new Promise((resolve, reject) => {
      this.#expected.set(header.msg_id, { published: [], reply: null, idle: false, hasReply, resolve });
      this.onMessage?.(message, "sent");
      const problem = this.#connection.send(message);
      if (problem === null) return;
      this.#expected.delete(header.msg_id);
      reject(new Error(problem));
    });
  }

  /** Runs a cell. Outputs of earlier cells change in place when this one updates their displays. */
  async execute(
    code: string,
    options: ExecuteOptions = {},
  ): Promise<{
    reply: ReplyContent<"execute_reply"> & CellReply;
    outputs: Output[];
    published: readonly Message[];
  }> {
    const { reply, published } = await this.request("execute_request", {
      code,
      stop_on_error: false,
      ...options,
    });
    const outputs = this.#collector.startCell();
    for (const message of published) this.#collector.take(message);
    return { reply: reply as unknown as ReplyContent<"execute_reply">, outputs, published };
  }

  #take(message: Message): void {
    this.onMessage?.(message, "received");
    const parent = message.parent_header;
    const expected =
      "msg_id" in parent ? this.#expected.get((parent as { msg_id: string }).msg_id) : undefined;
    if (expected === undefined) return;
    if (message.channel === "iopub") {
      expected.published.push(message);
      expected.idle = message.header.msg_type === "status" && message.content.execution_state === "idle";
    } else expected.reply = message;
    if (!expected.idle || (expected.hasReply && expected.reply === null)) return;
    this.#expected.delete((parent as { msg_id: string }).msg_id);
    expected.resolve({ reply: expected.reply?.content ?? {}, published: expected.published });
  }
}
