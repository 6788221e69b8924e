/**
 * What the kernel adds to the bare socket: `npx tsx tests/benchmarks/kernel.ts`.
 *
 * - The round trip of a trivial cell (a comment) through the server and the real session in its thread, from sending the
 *   request to the last of reply and idle, against an echo of the same bytes on a WebSocket of the same library. Both
 *   are warm; the ratio is that of the medians. Rounds alternate, so that both see the same machine.
 * - 200 cells in a row, each sent when the one before is answered, and all at once; each defines a theory and asks for
 *   a model. Given as multiples of 200 echoes.
 */
import { once } from "node:events";
import type { AddressInfo } from "node:net";
import { WebSocket, WebSocketServer } from "ws";
import { makeHeader } from "../../kernel/protocol/core.ts";
import { decodeFrame, encodeFrame, V1_SUBPROTOCOL } from "../../kernel/protocol/framing.ts";
import type { Message } from "../../kernel/protocol/messages.ts";
import { ThreadEvaluator } from "../../kernel/session/thread.ts";
import { startServer } from "../../kernel/transport/server.ts";

const WARM_UP = 300;
const ROUNDS = 2_000;
const CELLS = 200;

/** A kernel's channels, as bare as a client can be. */
class Channels {
  readonly #socket: WebSocket;
  readonly #waiting = new Map<string, { left: number; resolve: () => void }>();

  constructor(socket: WebSocket) {
    this.#socket = socket;
    socket.on("message", (data: Buffer) => {
      const decoded = decodeFrame(data, "v1");
      if ("problem" in decoded) throw new Error(decoded.problem);
      const message = decoded.frame as Message;
      if (message.content.status === "error") throw new Error(String(message.content.evalue));
      const isLast = message.channel !== "iopub" || message.content.execution_state === "idle";
      const waiting = this.#waiting.get((message.parent_header as { msg_id?: string }).msg_id ?? "");
      if (isLast && waiting !== undefined && --waiting.left === 0) waiting.resolve();
    });
  }

  /** Ends when the reply and the idle of the request have come. */
  execute(code: string): Promise<void> {
    const frame = executeRequest(code);
    return new Promise((resolve) => {
      this.#waiting.set(frame.id, { left: 2, resolve });
      this.#socket.send(frame.bytes);
    });
  }
}

function executeRequest(code: string): { id: string; bytes: string | Uint8Array } {
  const header = makeHeader("execute_request", "benchmark", "benchmark");
  const content = { code, silent: false, store_history: true, user_expressions: {}, stop_on_error: false };
  const message = {
    channel: "shell" as const,
    header,
    parent_header: {},
    metadata: {},
    content,
    buffers: [],
  };
  return { id: header.msg_id, bytes: encodeFrame(message, "v1") };
}

async function timed(work: () => Promise<unknown>): Promise<number> {
  const begun = performance.now();
  await work();
  return performance.now() - begun;
}

function quantile(times: readonly number[], part: number): number {
  return [...times].sort((a, b) => a - b)[Math.floor(part * times.length)]!;
}

async function open(address: string, protocols: string[] = []): Promise<WebSocket> {
  const socket = new WebSocket(address, protocols);
  await once(socket, "open");
  return socket;
}

const server = await startServer({ createEvaluator: () => new ThreadEvaluator() });
const headers = { Authorization: `token ${server.token}` };
const started = await fetch(`${server.url}api/kernels`, { method: "POST", headers });
const { id } = (await started.json()) as { id: string };
const address = `ws://127.0.0.1:${server.port}/api/kernels/${id}/channels?token=${server.token}&session_id=benchmark`;
const channels = new Channels(await open(address, [V1_SUBPROTOCOL]));

const echoServer = new WebSocketServer({ port: 0, host: "127.0.0.1" });
echoServer.on("connection", (socket) => socket.on("message", (data: Buffer) => socket.send(data)));
await once(echoServer, "listening");
const echoSocket = await open(`ws://127.0.0.1:${(echoServer.address() as AddressInfo).port}`);
const echo = async (): Promise<void> => {
  const answered = once(echoSocket, "message");
  echoSocket.send(executeRequest("# nothing").bytes);
  await answered;
};

for (let round = 0; round < WARM_UP; round++) {
  await channels.execute("# nothing");
  await echo();
}
const cells: number[] = [];
const echoes: number[] = [];
for (let round = 0; round < ROUNDS; round++) {
  cells.push(await timed(() => channels.execute("# nothing")));
  echoes.push(await timed(echo));
}
const [cell, bare] = [quantile(cells, 0.5), quantile(echoes, 0.5)];
console.log(`trivial cell, median of ${ROUNDS}: ${cell.toFixed(3)} ms; echo ${bare.toFixed(3)} ms`);
console.log(
  `ratio of medians ${(cell / bare).toFixed(1)}; 95 in 100 within ${(quantile(cells, 0.95) / bare).toFixed(1)} echoes`,
);

const sources = Array.from(
  { length: CELLS },
  (_, index) => `define T${index} := { irr: ∀x ¬Rxx; ser: ∀x ∃y Rxy }\ncheck-finite T${index}`,
);
const inARow = await timed(async () => {
  for (const source of sources) await channels.execute(source);
});
const atOnce = await timed(() => Promise.all(sources.map((source) => channels.execute(source))));
const ofEchoes = (time: number): string =>
  `${time.toFixed(0)} ms, ${(time / (CELLS * bare)).toFixed(1)} times ${CELLS} echoes`;
console.log(`${CELLS} cells in a row: ${ofEchoes(inARow)}`);
console.log(`${CELLS} cells sent at once: ${ofEchoes(atOnce)}`);

echoSocket.terminate();
echoServer.close();
await server.close();
