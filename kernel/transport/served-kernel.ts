/** A kernel that the server runs: one core, any number of clients, which may come and go. */
import { v4 as uuid } from "uuid";
import { KernelCore } from "../protocol/core.ts";
import { History } from "../protocol/history.ts";
import { KERNEL_NAME } from "../protocol/kernel-info.ts";
import type { Message } from "../protocol/messages.ts";
import type { Evaluator } from "../session/evaluator.ts";

/** What the REST side tells of a kernel. */
export interface KernelModel {
  readonly id: string;
  readonly name: string;
  /** ISO 8601. */
  readonly last_activity: string;
  readonly execution_state: "idle" | "busy" | "starting";
  readonly connections: number;
}

/** A client's open socket. */
export interface ClientSocket {
  send(message: Message): void;
  close(code: number, reason: string): void;
}

/** A client by the session id that it gave; it keeps its place while its socket is away. */
interface Client {
  socket: ClientSocket | null;
  /** What was sent while the socket was away. */
  missed: Message[];
}

/** A client that has missed more than this is forgotten. */
const MOST_MISSED = 5_000;
/** Only the latest clients that are away are waited for. */
const MOST_AWAY = 8;

export interface ServedKernelOptions {
  readonly createEvaluator: () => Evaluator;
  /** A client has asked for the kernel's end. */
  readonly onShutdown: () => void;
  readonly log: (line: string) => void;
}

export class ServedKernel {
  readonly id = uuid();
  readonly #options: ServedKernelOptions;
  readonly #history = new History();
  readonly #clients = new Map<string, Client>();
  #core: KernelCore;
  #lastActivity = new Date();
  /** What arrives during a restart; null when there is none. */
  #held: (() => void)[] | null = null;

  constructor(options: ServedKernelOptions) {
    this.#options = options;
    this.#core = this.#makeCore();
  }

  get model(): KernelModel {
    return {
      id: this.id,
      name: KERNEL_NAME,
      last_activity: this.#lastActivity.toISOString(),
      execution_state: this.#held !== null ? "starting" : this.#core.isBusy ? "busy" : "idle",
      connections: [...this.#clients.values()].filter((client) => client.socket !== null).length,
    };
  }

  /**
   * Gives a client its socket, with what it missed. A socket that it still had is closed.
   * @param key the client's session id, or anything unique
   */
  connect(key: string, socket: ClientSocket): void {
    const client = this.#clients.get(key) ?? { socket: null, missed: [] };
    client.socket?.close(1000, "a newer socket of the same session takes over");
    client.socket = socket;
    // At the end, as the one that was here last.
    this.#clients.delete(key);
    this.#clients.set(key, client);
    const { missed } = client;
    client.missed = [];
    for (const message of missed) socket.send(message);
  }

  /** @param stays whether the client is waited for */
  disconnect(key: string, socket: ClientSocket, stays: boolean): void {
    const client = this.#clients.get(key);
    if (client?.socket !== socket) return;
    client.socket = null;
    if (!stays) this.#clients.delete(key);
    const away = [...this.#clients].filter(([, each]) => each.socket === null);
    for (const [oldest] of away.slice(0, -MOST_AWAY)) this.#clients.delete(oldest);
  }

  /** Takes a client's request; see {@link KernelCore.receive}. */
  receive(key: string, message: unknown): string | null {
    this.#lastActivity = new Date();
    if (this.#held !== null) {
      this.#held.push(() => this.receive(key, message));
      return null;
    }
    return this.#core.receive(message, (reply) => {
      const client = this.#clients.get(key);
      if (client !== undefined) this.#deliver(key, client, reply);
    });
  }

  interrupt(): void {
    this.#core.interrupt();
  }

  /** Begins anew, with the history kept. What runs ends with an error; what arrives meanwhile is for the new session. */
  async restart(): Promise<void> {
    if (this.#held !== null) return;
    this.#held = [];
    await this.#core.close();
    this.#history.startSession();
    for (const client of this.#clients.values()) client.missed = [];
    this.#core = this.#makeCore();
    const held = this.#held;
    this.#held = null;
    this.#core.announce();
    for (const receive of held) receive();
  }

  /** Ends the kernel and closes its sockets. */
  async close(code: number, reason: string): Promise<void> {
    await this.#core.close();
    for (const client of this.#clients.values()) client.socket?.close(code, reason);
    this.#clients.clear();
  }

  #makeCore(): KernelCore {
    return new KernelCore({
      evaluator: this.#options.createEvaluator(),
      history: this.#history,
      publish: (message) => {
        this.#lastActivity = new Date();
        for (const [key, client] of this.#clients) this.#deliver(key, client, message);
      },
      onShutdown: (restart) => {
        if (restart) void this.restart();
        else this.#options.onShutdown();
      },
      log: this.#options.log,
    });
  }

  #deliver(key: string, client: Client, message: Message): void {
    if (client.socket !== null) client.socket.send(message);
    else if (client.missed.length < MOST_MISSED) client.missed.push(message);
    else this.#clients.delete(key);
  }
}
