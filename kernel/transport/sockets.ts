/** The WebSockets of the server: a kernel's channels, and the stream of events that front ends subscribe to. */
import type { IncomingMessage } from "node:http";
import type { Duplex } from "node:stream";
import { v4 as uuid } from "uuid";
import { type WebSocket, WebSocketServer } from "ws";
import { decodeFrame, encodeFrame, type Framing, V1_SUBPROTOCOL } from "../protocol/framing.ts";
import type { Kernels } from "./kernels.ts";
import type { ClientSocket, ServedKernel } from "./served-kernel.ts";

/** A longer frame ends its socket with code 1009. */
const MOST_FRAME_BYTES = 32 * 1024 * 1024;
/** RFC 6455, section 7.4.1: data within a message were not consistent with its type. */
const CLOSE_MALFORMED = 1007;

export class Sockets {
  readonly #kernels: Kernels;
  readonly #log: (line: string) => void;
  readonly #server = new WebSocketServer({
    noServer: true,
    maxPayload: MOST_FRAME_BYTES,
    handleProtocols: (offered) => (offered.has(V1_SUBPROTOCOL) ? V1_SUBPROTOCOL : false),
  });

  constructor(kernels: Kernels, log: (line: string) => void) {
    this.#kernels = kernels;
    this.#log = log;
  }

  /**
   * Makes a request that has been let in a WebSocket.
   * @returns false when there is no WebSocket at its path; nothing has been sent then
   */
  upgrade(
    request: IncomingMessage,
    stream: Duplex,
    head: Buffer,
    path: readonly string[],
    url: URL,
  ): boolean {
    const [api, kind, id, channels] = path;
    if (api !== "api") return false;
    if (kind === "events" && id === "subscribe" && path.length === 3) {
      // Nothing is ever sent here; without the socket, front ends would ask for it for ever.
      this.#server.handleUpgrade(request, stream, head, (socket) => this.#watch(socket));
      return true;
    }
    const kernel = kind === "kernels" && channels === "channels" ? this.#kernels.find(id!) : null;
    if (kernel === null || path.length !== 4) return false;
    const session = url.searchParams.get("session_id") ?? "";
    this.#server.handleUpgrade(request, stream, head, (socket) =>
      this.#serve(socket, stream, kernel, session),
    );
    return true;
  }

  /** Closes what is still open. */
  close(): void {
    for (const socket of this.#server.clients) socket.close(1001, "the server is going away");
    this.#server.close();
  }

  /** Ends the sockets that have not answered the closing. */
  terminate(): void {
    for (const socket of this.#server.clients) socket.terminate();
  }

  /** Errors end a socket by themselves; they are told, not thrown. */
  #watch(socket: WebSocket): void {
    socket.on("error", (error) => this.#log(`a socket has failed: ${error.message}`));
  }

  #serve(socket: WebSocket, stream: Duplex, kernel: ServedKernel, session: string): void {
    this.#watch(socket);
    const framing: Framing = socket.protocol === V1_SUBPROTOCOL ? "v1" : "legacy";
    const key = session === "" ? uuid() : session;
    let corked = false;
    const client: ClientSocket = {
      send: (message) => {
        if (socket.readyState !== socket.OPEN) return;
        // What is sent in one go of the loop, such as a reply and its idle, leaves in one write.
        if (!corked) {
          corked = true;
          stream.cork();
          process.nextTick(() => {
            corked = false;
            stream.uncork();
          });
        }
        socket.send(encodeFrame(message, framing));
      },
      close: (code, reason) => socket.close(code, reason),
    };
    socket.on("message", (data: Buffer, isBinary: boolean) => {
      const decoded = decodeFrame(isBinary ? data : data.toString("utf8"), framing);
      const problem = "problem" in decoded ? decoded.problem : kernel.receive(key, decoded.frame);
      if (problem === null) return;
      this.#log(`a malformed frame: ${problem}`);
      socket.close(CLOSE_MALFORMED, shorten(problem));
    });
    // A client without a session id cannot be known again.
    socket.on("close", () => kernel.disconnect(key, client, session !== ""));
    kernel.connect(key, client);
  }
}

/** A reason for a close frame has at most 123 bytes (RFC 6455, section 5.5). */
function shorten(reason: string): string {
  let short = reason.slice(0, 123);
  while (Buffer.byteLength(short) > 123) short = short.slice(0, -1);
  return short;
}
