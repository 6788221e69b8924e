/** The server: kernels over HTTP and WebSocket for Jupyter's front ends. */
import { once } from "node:events";
import {
  createServer,
  type IncomingMessage,
  type Server,
  type ServerResponse,
  STATUS_CODES,
} from "node:http";
import type { AddressInfo } from "node:net";
import type { Duplex } from "node:stream";
import type { Evaluator } from "../session/evaluator.ts";
import { Access, makeToken } from "./access.ts";
import { Kernels } from "./kernels.ts";
import { failure, type RestResponse } from "./rest.ts";
import { answerRest, type RestContext } from "./routes.ts";
import { Sockets } from "./sockets.ts";

export interface ServerOptions {
  /** 0, the default, lets the system choose. */
  readonly port?: number;
  /** The address to listen at; 127.0.0.1 by default, which only this machine reaches. */
  readonly host?: string;
  /** What clients must show; by default 32 random bytes in hexadecimal. */
  readonly token?: string;
  /** The folder whose files are shown; none by default. */
  readonly root?: string;
  /** Makes the evaluator of a new or restarted kernel. */
  readonly createEvaluator: () => Evaluator;
  /** Takes what a developer may want to know; nothing by default. */
  readonly log?: (line: string) => void;
}

export interface RunningServer {
  /** The base of all addresses, with a slash at the end. */
  readonly url: string;
  readonly token: string;
  readonly port: number;
  /** Ends all kernels, closes all sockets and stops listening. */
  close(): Promise<void>;
}

const MOST_BODY_BYTES = 1024 * 1024;
/** How long clients get to answer the closing of their sockets. */
const CLOSING_MS = 200;

/** Starts a server. Rejects when it cannot listen, with the system's code (`EADDRINUSE`, `EACCES`, …). */
export async function startServer(options: ServerOptions): Promise<RunningServer> {
  const host = options.host ?? "127.0.0.1";
  const token = options.token ?? makeToken();
  const log = options.log ?? (() => undefined);
  const access = new Access(token, host);
  const kernels = new Kernels(options.createEvaluator, log);
  const sockets = new Sockets(kernels, log);
  const context: RestContext = { kernels, root: options.root ?? null };

  const server = createServer((request, response) => {
    answer(request, access, context)
      .catch((error: unknown) => {
        log(error instanceof Error ? String(error.stack) : String(error));
        return failure(500, "the server has made a mistake");
      })
      .then((answered) => send(response, answered, request.method === "HEAD"));
  });
  server.on("upgrade", (request: IncomingMessage, stream: Duplex, head: Buffer) => {
    stream.on("error", (error) => log(`a connection has failed: ${error.message}`));
    const refusal = refuseUpgrade(request, stream, head, access, sockets);
    if (refusal !== null) sendRaw(stream, refusal);
  });
  await listen(server, options.port ?? 0, host);

  const { port } = server.address() as AddressInfo;
  const name = host.includes(":") ? `[${host}]` : host;
  const close = async (): Promise<void> => {
    const closed = once(server, "close");
    server.close();
    await kernels.close();
    sockets.close();
    const timer = setTimeout(() => {
      sockets.terminate();
      server.closeAllConnections();
    }, CLOSING_MS);
    server.closeIdleConnections();
    await closed;
    clearTimeout(timer);
  };
  return { url: `http://${name}:${port}/`, token, port, close };
}

async function listen(server: Server, port: number, host: string): Promise<void> {
  server.listen(port, host);
  // Rejects with the error, should one come first.
  await once(server, "listening");
}

async function answer(request: IncomingMessage, access: Access, context: RestContext): Promise<RestResponse> {
  const target = readTarget(request);
  if (target === null) return failure(400, "the address is malformed");
  const refusal = access.findRefusal(request.headers, target.url);
  if (refusal !== null) return failure(refusal.status, refusal.message);
  const read = await readBody(request);
  if ("refusal" in read) return read.refusal;
  const method = request.method === "HEAD" ? "GET" : (request.method ?? "GET");
  return answerRest(context, { method, path: target.path, query: target.url.searchParams, body: read.body });
}

/** Makes the request a WebSocket, or says why not. */
function refuseUpgrade(
  request: IncomingMessage,
  stream: Duplex,
  head: Buffer,
  access: Access,
  sockets: Sockets,
): RestResponse | null {
  const target = readTarget(request);
  if (target === null) return failure(400, "the address is malformed");
  const refusal = access.findRefusal(request.headers, target.url);
  if (refusal !== null) return failure(refusal.status, refusal.message);
  if (sockets.upgrade(request, stream, head, target.path, target.url)) return null;
  return failure(404, `there is no WebSocket at /${target.path.join("/")}`);
}

/** The address and the decoded parts of its path; null where it cannot be read. */
function readTarget(request: IncomingMessage): { url: URL; path: string[] } | null {
  try {
    // Only path and query are of interest; the host is checked by its header.
    const url = new URL(`http://host${request.url ?? "/"}`);
    // A slash at the end makes no difference.
    const path = url.pathname
      .replace(/^\/|\/$/g, "")
      .split("/")
      .map(decodeURIComponent);
    return { url, path };
  } catch {
    return null;
  }
}

async function readBody(request: IncomingMessage): Promise<{ body: unknown } | { refusal: RestResponse }> {
  const chunks: Buffer[] = [];
  let size = 0;
  // The request is not destroyed when the loop is left early, since it still has to be answered.
  for await (const chunk of request.iterator({ destroyOnReturn: false }) as AsyncIterable<Buffer>) {
    size += chunk.length;
    if (size > MOST_BODY_BYTES) {
      const refusal = failure(413, `the body has more than ${MOST_BODY_BYTES} bytes`);
      // The rest of the body is not waited for.
      return { refusal: { ...refusal, headers: { Connection: "close" } } };
    }
    chunks.push(chunk);
  }
  if (size === 0) return { body: undefined };
  try {
    return { body: JSON.parse(Buffer.concat(chunks).toString("utf8")) };
  } catch (error) {
    return { refusal: failure(400, `the body is not JSON: ${(error as Error).message.slice(0, 120)}`) };
  }
}

const SAFE_HEADERS = {
  "Cache-Control": "no-store",
  "Content-Security-Policy": "default-src 'none'; frame-ancestors 'none'",
  "X-Content-Type-Options": "nosniff",
};

function send(response: ServerResponse, { status, headers, body }: RestResponse, isHead: boolean): void {
  if (response.destroyed) return;
  const text = body === undefined ? "" : JSON.stringify(body);
  response.writeHead(status, {
    ...SAFE_HEADERS,
    ...(status === 204
      ? {}
      : { "Content-Type": "application/json", "Content-Length": Buffer.byteLength(text) }),
    ...headers,
  });
  response.end(isHead || status === 204 ? undefined : text);
}

/** A plain answer to a request that wanted a WebSocket. */
function sendRaw(stream: Duplex, { status, body }: RestResponse): void {
  const text = JSON.stringify(body);
  stream.end(
    [
      `HTTP/1.1 ${status} ${STATUS_CODES[status]}`,
      "Connection: close",
      "Content-Type: application/json",
      `Content-Length: ${Buffer.byteLength(text)}`,
      "",
      text,
    ].join("\r\n"),
  );
}
