/** Connects the real client library of Jupyter's front ends to a server of ours. */
import {
  type Kernel,
  KernelManager,
  type KernelMessage,
  ServerConnection,
  SessionManager,
} from "@jupyterlab/services";
import { WebSocket } from "ws";
import type { CellReply, CellRunner } from "../../kernel/notebook/execute.ts";
import type { Output } from "../../kernel/notebook/nbformat.ts";
import { OutputCollector } from "../../kernel/notebook/outputs.ts";

/** Settings of the client for a server. */
export function settingsFor(server: { url: string; token: string }): ServerConnection.ISettings {
  return ServerConnection.makeSettings({
    baseUrl: server.url,
    token: server.token,
    appendToken: true,
    WebSocket: WebSocket as unknown as typeof globalThis.WebSocket,
  });
}

export function kernelManagerFor(server: { url: string; token: string }): KernelManager {
  return new KernelManager({ serverSettings: settingsFor(server), standby: "never" });
}

export function sessionManagerFor(
  server: { url: string; token: string },
  kernels: KernelManager,
): SessionManager {
  return new SessionManager({
    kernelManager: kernels,
    serverSettings: settingsFor(server),
    standby: "never",
  });
}

/** What one request brought about. */
export interface Executed {
  readonly reply: KernelMessage.IExecuteReplyMsg["content"];
  readonly published: readonly KernelMessage.IIOPubMessage[];
}

/** Runs code and waits until the kernel is idle again. */
export async function execute(
  kernel: Kernel.IKernelConnection,
  content: KernelMessage.IExecuteRequestMsg["content"],
): Promise<Executed> {
  const published: KernelMessage.IIOPubMessage[] = [];
  const future = kernel.requestExecute(content);
  future.onIOPub = (message) => {
    published.push(message);
  };
  const reply = await future.done;
  return { reply: reply.content, published };
}

/** Runs a notebook's cells over a connection of the real client. */
export class ConnectionRunner implements CellRunner {
  readonly #kernel: Kernel.IKernelConnection;
  readonly #collector = new OutputCollector();

  constructor(kernel: Kernel.IKernelConnection) {
    this.#kernel = kernel;
  }

  async execute(code: string): Promise<{ reply: CellReply; outputs: readonly Output[] }> {
    const { reply, published } = await execute(this.#kernel, { code, stop_on_error: false });
    const outputs = this.#collector.startCell();
    for (const message of published) this.#collector.take(message);
    return { reply: reply as CellReply, outputs };
  }
}
