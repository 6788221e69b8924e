/**
 * The server with the real client of Jupyter's front ends, `@jupyterlab/services`: what works in memory works over
 * sockets, and what must be kept out is. All traffic is checked against the schemas.
 */
import { mkdir, mkdtemp, rm, symlink, writeFile } from "node:fs/promises";
import { request as httpRequest } from "node:http";
import { tmpdir } from "node:os";
import { join } from "node:path";
import type { Kernel, KernelManager } from "@jupyterlab/services";
import { afterAll, afterEach, beforeAll, beforeEach, describe, expect, test } from "vitest";
import { WebSocket } from "ws";
import { executeNotebook } from "../kernel/notebook/execute.ts";
import { makeHeader } from "../kernel/protocol/core.ts";
import { decodeFrame, encodeFrame, type Framing, V1_SUBPROTOCOL } from "../kernel/protocol/framing.ts";
import type { Message } from "../kernel/protocol/messages.ts";
import { ThreadEvaluator } from "../kernel/session/thread.ts";
import { type RunningServer, startServer } from "../kernel/transport/server.ts";
import {
  ConnectionRunner,
  execute,
  kernelManagerFor,
  sessionManagerFor,
} from "./support/client-connection.ts";
import { Recorder } from "./support/kernel-recorder.ts";
import { ScriptEvaluator } from "./support/kernel-script.ts";

const workerEntry = new URL("./support/kernel-script-worker.ts", import.meta.url);

let server: RunningServer;
let manager: KernelManager;
let recorder: Recorder;
let folder: string;
/** Whether new kernels run their cells in a thread of their own, as real ones do. */
let inThread = false;
const log: string[] = [];

beforeAll(async () => {
  // The client tells its own doings on the console.
  console.debug = () => undefined;
  console.warn = () => undefined;
  folder = await mkdtemp(join(tmpdir(), "served-"));
  await mkdir(join(folder, "shown"));
  await writeFile(join(folder, "secret.txt"), "secret");
  await writeFile(join(folder, "shown", "note.txt"), "∀x");
  await writeFile(join(folder, "shown", "bytes.bin"), Buffer.from([0xff, 0xfe]));
  await writeFile(join(folder, "shown", ".hidden"), "hidden");
  await writeFile(
    join(folder, "shown", "n.ipynb"),
    JSON.stringify({ nbformat: 4, nbformat_minor: 5, metadata: {}, cells: [] }),
  );
  await writeFile(join(folder, "shown", "bad.ipynb"), "{}");
  await symlink(join(folder, "secret.txt"), join(folder, "shown", "way-out.txt"));
  server = await startServer({
    root: join(folder, "shown"),
    createEvaluator: () => (inThread ? new ThreadEvaluator({ entry: workerEntry }) : new ScriptEvaluator()),
    log: (line) => log.push(line),
  });
});

afterAll(async () => {
  await server.close();
  await rm(folder, { recursive: true });
});

beforeEach(() => {
  manager = kernelManagerFor(server);
  recorder = new Recorder();
  inThread = false;
});

afterEach(async () => {
  await manager.shutdownAll();
  manager.dispose();
  expect(recorder.problems).toEqual([]);
});

async function startKernel(): Promise<Kernel.IKernelConnection> {
  const kernel = await manager.startNew({ name: "twoplace" });
  watch(kernel);
  await kernel.info;
  return kernel;
}

/** For tests in which a socket goes away before a request has been answered over it. */
function forgetOrder(): void {
  expect(recorder.schemaProblems).toEqual([]);
  recorder = new Recorder();
}

function watch(kernel: Kernel.IKernelConnection): void {
  kernel.anyMessage.connect((_, { msg, direction }) =>
    recorder.record(msg, direction === "send" ? "sent" : "received"),
  );
}

/** A plain request, with whatever headers and path a client may make up. */
function ask(
  path: string,
  options: { method?: string; headers?: Record<string, string>; body?: string; token?: string | null } = {},
): Promise<{
  status: number;
  body: { message?: string } & Record<string, unknown>;
  headers: Record<string, unknown>;
}> {
  const { token = server.token } = options;
  return new Promise((resolve, reject) => {
    const request = httpRequest(
      {
        host: "127.0.0.1",
        port: server.port,
        path,
        method: options.method ?? "GET",
        headers: { ...(token === null ? {} : { Authorization: `token ${token}` }), ...options.headers },
      },
      (response) => {
        const chunks: Buffer[] = [];
        response.on("data", (chunk: Buffer) => chunks.push(chunk));
        response.on("end", () => {
          const text = Buffer.concat(chunks).toString();
          const body = text === "" ? {} : JSON.parse(text);
          resolve({ status: response.statusCode!, body, headers: response.headers });
        });
      },
    );
    request.on("error", reject);
    request.end(options.body);
  });
}

describe("a kernel through the real client", () => {
  test("connects with the published subprotocol and says what it is", async () => {
    const kernel = await startKernel();
    expect(await kernel.info).toMatchObject({ implementation: "twoplace", protocol_version: "5.5" });
    expect((await kernel.spec)?.display_name).toBe("Twoplace");
    await manager.refreshRunning();
    expect(manager.runningCount).toBe(1);
  });

  test("runs cells: streams, displays and their updates, errors, the count", async () => {
    const kernel = await startKernel();
    const first = await execute(kernel, { code: "print one\nbegin p wait\nupdate p done" });
    expect(first.reply).toMatchObject({ status: "ok", execution_count: 1 });
    expect(first.published.map((message) => message.header.msg_type)).toEqual([
      "status",
      "execute_input",
      "stream",
      "display_data",
      "update_display_data",
      "status",
    ]);
    const failing = await execute(kernel, { code: "fail so" });
    expect(failing.reply).toMatchObject({
      status: "error",
      ename: "Failure",
      evalue: "so",
      execution_count: 2,
    });
    const silent = await execute(kernel, { code: "show x", silent: true });
    expect(silent.published.map((message) => message.header.msg_type)).toEqual(["status", "status"]);
  });

  test("stop_on_error aborts what waits", async () => {
    const kernel = await startKernel();
    const replies = await Promise.all(
      ["fail x", "print a", "print b"].map((code) => execute(kernel, { code, stop_on_error: true })),
    );
    expect(replies.map(({ reply }) => reply.status)).toEqual(["error", "aborted", "aborted"]);
    expect((await execute(kernel, { code: "print c" })).reply.status).toBe("ok");
  });

  test("completes, inspects, judges completeness, remembers, and has no comms", async () => {
    const kernel = await startKernel();
    await execute(kernel, { code: "define Marsh 1" });
    expect((await kernel.requestComplete({ code: "𝔸 Ma", cursor_pos: 4 })).content).toMatchObject({
      matches: ["Marsh"],
      cursor_start: 2,
    });
    const inspect = await kernel.requestInspect({ code: "Marsh", cursor_pos: 0, detail_level: 0 });
    expect(inspect.content).toMatchObject({ found: true });
    expect((await kernel.requestIsComplete({ code: "{" })).content).toMatchObject({ status: "incomplete" });
    const history = await kernel.requestHistory({ hist_access_type: "tail", n: 5, output: false, raw: true });
    expect(history.content).toMatchObject({ history: [[1, 1, "define Marsh 1"]] });
    expect((await kernel.requestCommInfo({})).content).toMatchObject({ comms: {} });
    const comm = kernel.createComm("nowhere");
    const closed = new Promise<void>((resolve) => {
      comm.onClose = () => resolve();
    });
    comm.open({});
    await closed;
  });

  test("an interrupt stops a cell that keeps its thread busy, and definitions stay", async () => {
    inThread = true;
    const kernel = await startKernel();
    await execute(kernel, { code: "define Marsh 1" });
    const running = execute(kernel, { code: "print begun\nspin" });
    await new Promise<void>((resolve) => {
      kernel.iopubMessage.connect((_, message) => {
        if (message.header.msg_type === "stream") resolve();
      });
    });
    expect(kernel.status).toBe("busy");
    await kernel.interrupt();
    expect((await running).reply).toMatchObject({ status: "error", ename: "Interrupted" });
    const { published } = await execute(kernel, { code: "recall" });
    expect(published).toContainEqual(expect.objectContaining({ content: { name: "stdout", text: "Marsh" } }));
  });

  test("a restart forgets definitions and counts from 1, keeps the history, and the connection lives on", async () => {
    inThread = true;
    const kernel = await startKernel();
    await execute(kernel, { code: "define Marsh 1" });
    void execute(kernel, { code: "spin" }).catch(() => undefined);
    await kernel.restart();
    await kernel.requestKernelInfo();
    const { reply, published } = await execute(kernel, { code: "recall" });
    expect(reply).toMatchObject({ status: "ok", execution_count: 1 });
    expect(published).toContainEqual(expect.objectContaining({ content: { name: "stdout", text: "" } }));
    const history = await kernel.requestHistory({
      hist_access_type: "range",
      session: -1,
      start: 0,
      stop: 9,
      output: false,
      raw: true,
    });
    expect(history.content).toMatchObject({ history: [[1, 1, "define Marsh 1"], expect.anything()] });
    // The cell that was cut short was never answered over its socket, which had closed.
    forgetOrder();
  });

  test("a shutdown removes the kernel; another lives on", async () => {
    const [one, two] = [await startKernel(), await startKernel()];
    await execute(one, { code: "define Marsh 1" });
    await execute(two, { code: "define Moor 1" });
    const recalled = await execute(two, { code: "recall" });
    expect(recalled.published).toContainEqual(
      expect.objectContaining({ content: { name: "stdout", text: "Moor" } }),
    );
    await one.shutdown();
    expect(one.status).toBe("dead");
    expect((await ask(`/api/kernels/${one.id}`)).status).toBe(404);
    expect((await execute(two, { code: "print x" })).reply.status).toBe("ok");
  });

  test("a socket that breaks is opened again, and what was missed arrives", async () => {
    const kernel = await startKernel();
    const running = execute(kernel, { code: "print begun\npause" });
    while (kernel.status !== "busy") await new Promise((resolve) => setTimeout(resolve, 1));
    // The client's own socket, ended as a broken network would end it.
    (kernel as unknown as { _ws: WebSocket })._ws.terminate();
    await kernel.interrupt();
    expect((await running).reply).toMatchObject({ status: "error", ename: "Interrupted" });
    expect((await execute(kernel, { code: "print x" })).reply.status).toBe("ok");
  });

  test("a notebook runs over the connection", async () => {
    const kernel = await startKernel();
    const cell = (source: string) => ({
      cell_type: "code" as const,
      metadata: {},
      source,
      outputs: [],
      execution_count: null,
    });
    const notebook = {
      nbformat: 4 as const,
      nbformat_minor: 5,
      metadata: {},
      cells: [cell("begin p a"), cell("fail x"), cell("update p b")],
    };
    const { notebook: executed, failed } = await executeNotebook(notebook, new ConnectionRunner(kernel));
    expect(failed).toEqual([{ number: 2, ename: "Failure", evalue: "x" }]);
    expect(executed.cells[0]).toMatchObject({ outputs: [{ data: { "text/plain": "a" } }] });
  });

  test("sessions give kernels paths", async () => {
    const sessions = sessionManagerFor(server, manager);
    const session = await sessions.startNew({
      path: "a.ipynb",
      name: "a",
      type: "notebook",
      kernel: { name: "twoplace" },
    });
    watch(session.kernel!);
    expect((await execute(session.kernel!, { code: "print x" })).reply.status).toBe("ok");
    await session.setPath("b.ipynb");
    await sessions.refreshRunning();
    expect((await sessions.findByPath("b.ipynb"))?.id).toBe(session.id);
    const before = session.kernel!.id;
    await session.changeKernel({ name: "twoplace" });
    expect(session.kernel!.id).not.toBe(before);
    expect((await ask(`/api/kernels/${before}`)).status).toBe(404);
    await session.shutdown();
    expect((await ask("/api/sessions")).body).toEqual([]);
    sessions.dispose();
  });
});

/** A socket without a client library. */
class RawSocket {
  readonly #socket: WebSocket;
  readonly #framing: Framing;
  readonly received: Message[] = [];
  readonly closed: Promise<{ code: number; reason: string }>;
  readonly session: string;

  constructor(
    kernel: string,
    options: { framing?: Framing; session?: string; headers?: Record<string, string>; query?: string } = {},
  ) {
    this.#framing = options.framing ?? "v1";
    this.session = options.session ?? "raw";
    const query = options.query ?? `token=${server.token}&session_id=${this.session}`;
    const address = `ws://127.0.0.1:${server.port}/api/kernels/${kernel}/channels?${query}`;
    this.#socket = new WebSocket(address, this.#framing === "v1" ? [V1_SUBPROTOCOL] : [], {
      headers: options.headers ?? {},
    });
    this.#socket.on("message", (data: Buffer, isBinary: boolean) => {
      const decoded = decodeFrame(isBinary ? data : data.toString(), this.#framing);
      if ("frame" in decoded) {
        const message = decoded.frame as Message;
        this.received.push(message);
        recorder.record(message, "received");
      }
    });
    this.closed = new Promise((resolve) => {
      this.#socket.on("close", (code, reason) => resolve({ code, reason: reason.toString() }));
    });
    this.#socket.on("error", () => undefined);
  }

  /** Resolves when open; rejects with the HTTP status when refused. */
  open(): Promise<this> {
    return new Promise((resolve, reject) => {
      this.#socket.on("open", () => resolve(this));
      this.#socket.on("unexpected-response", (_, response) => reject(new Error(String(response.statusCode))));
    });
  }

  get protocol(): string {
    return this.#socket.protocol;
  }

  request(type: string, content: object, channel: Message["channel"] = "shell"): string {
    const header = makeHeader(type, this.session, "raw");
    const message = { channel, header, parent_header: {}, metadata: {}, content, buffers: [] };
    this.#socket.send(encodeFrame(message as Message, this.#framing));
    return header.msg_id;
  }

  sendRaw(data: string | Uint8Array): void {
    this.#socket.send(data);
  }

  /** Waits for the reply and the idle of a request. */
  async answered(id: string): Promise<Message> {
    const ofRequest = () =>
      this.received.filter((each) => (each.parent_header as { msg_id?: string }).msg_id === id);
    for (;;) {
      const reply = ofRequest().find((each) => each.channel !== "iopub");
      const isIdle = ofRequest().some((each) => each.content.execution_state === "idle");
      if (reply !== undefined && isIdle) return reply;
      await new Promise((resolve) => setTimeout(resolve, 1));
    }
  }

  drop(): void {
    this.#socket.terminate();
  }
}

async function newKernelId(): Promise<string> {
  const { status, body } = await ask("/api/kernels", { method: "POST", body: "" });
  expect(status).toBe(201);
  return body.id as string;
}

describe("raw sockets", () => {
  test.each<Framing>(["v1", "legacy"])("framing %s is chosen by the subprotocol", async (framing) => {
    const socket = await new RawSocket(await newKernelId(), { framing }).open();
    expect(socket.protocol).toBe(framing === "v1" ? V1_SUBPROTOCOL : "");
    const reply = await socket.answered(socket.request("kernel_info_request", {}, "control"));
    expect(reply).toMatchObject({
      channel: "control",
      content: { status: "ok", implementation: "twoplace" },
    });
    const executed = await socket.answered(socket.request("execute_request", { code: "print ∀" }));
    expect(executed.content.status).toBe("ok");
  });

  test("what was missed while a socket was away comes with the next of the same session", async () => {
    const id = await newKernelId();
    const first = await new RawSocket(id, { session: "s1" }).open();
    const other = await new RawSocket(id, { session: "s2" }).open();
    const running = first.request("execute_request", { code: "print begun\npause" });
    while (!first.received.some((each) => each.header.msg_type === "stream"))
      await new Promise((resolve) => setTimeout(resolve, 1));
    first.drop();
    await first.closed;
    await other.answered(other.request("interrupt_request", {}, "control"));
    const again = await new RawSocket(id, { session: "s1" }).open();
    expect((await again.answered(running)).content).toMatchObject({ status: "error", ename: "Interrupted" });
    // The other saw all that was published, and no reply that was not its own.
    expect(other.received.filter((each) => each.header.msg_type === "execute_reply")).toEqual([]);
    expect(other.received.some((each) => each.header.msg_type === "error")).toBe(true);
    forgetOrder();
  });

  test("a newer socket of the same session takes over", async () => {
    const id = await newKernelId();
    const first = await new RawSocket(id).open();
    const second = await new RawSocket(id).open();
    expect(await first.closed).toMatchObject({ code: 1000 });
    expect((await second.answered(second.request("kernel_info_request", {}))).content.status).toBe("ok");
  });

  test.each<[string, Framing, string | Uint8Array, string]>([
    ["text under v1", "v1", "hello", "a text frame"],
    ["bytes that are no frame", "v1", Buffer.from("hello"), "too few for a count"],
    ["JSON that is no message", "legacy", "{}", "channel"],
    [
      "a header without id",
      "legacy",
      JSON.stringify({ channel: "shell", header: {}, content: {} }),
      "header.msg_id",
    ],
  ])("%s: closed with a code and a reason, and the kernel lives on", async (_, framing, data, reason) => {
    const id = await newKernelId();
    const socket = await new RawSocket(id, { framing }).open();
    socket.sendRaw(data);
    const closed = await socket.closed;
    expect(closed.code).toBe(1007);
    expect(closed.reason).toContain(reason);
    const next = await new RawSocket(id, { framing }).open();
    expect((await next.answered(next.request("execute_request", { code: "print x" }))).content.status).toBe(
      "ok",
    );
  });

  test("a malformed request is answered and the socket stays", async () => {
    const socket = await new RawSocket(await newKernelId()).open();
    const reply = await socket.answered(socket.request("execute_request", { code: 7 }));
    expect(reply.content).toMatchObject({ status: "error", ename: "MalformedRequest" });
    expect(
      (await socket.answered(socket.request("execute_request", { code: "print x" }))).content.status,
    ).toBe("ok");
  });

  test("a frame beyond the bound ends the socket, not the kernel", async () => {
    const id = await newKernelId();
    const socket = await new RawSocket(id).open();
    socket.sendRaw(Buffer.alloc(33 * 1024 * 1024));
    expect((await socket.closed).code).toBe(1009);
    await (await new RawSocket(id).open()).drop();
  });

  test("a cell of 1 MB arrives", async () => {
    const socket = await new RawSocket(await newKernelId()).open();
    const code = `print ${"x".repeat(1024 * 1024)}`;
    await socket.answered(socket.request("execute_request", { code }));
    const stream = socket.received.find((each) => each.header.msg_type === "stream");
    expect(stream?.content.text).toHaveLength(1024 * 1024 + 1);
  });

  test("shutdown and restart by message", async () => {
    const id = await newKernelId();
    const socket = await new RawSocket(id).open();
    const before = await socket.answered(socket.request("execute_request", { code: "define Marsh 1" }));
    await socket.answered(socket.request("shutdown_request", { restart: true }, "control"));
    while (!socket.received.some((each) => each.content.execution_state === "starting"))
      await new Promise((resolve) => setTimeout(resolve, 1));
    const after = await socket.answered(socket.request("execute_request", { code: "recall" }));
    expect(after.content.execution_count).toBe(1);
    expect(after.header.session).not.toBe(before.header.session);
    await socket.answered(socket.request("shutdown_request", { restart: false }, "control"));
    expect(await socket.closed).toEqual({ code: 1000, reason: "the kernel was shut down" });
    expect((await ask(`/api/kernels/${id}`)).status).toBe(404);
  });

  test.each<[string, { headers?: Record<string, string>; query?: string }, string]>([
    ["no token", { query: "" }, "401"],
    ["a wrong token", { query: "token=0123" }, "403"],
    ["a foreign Origin", { headers: { Origin: "https://elsewhere.example" } }, "403"],
    ["a foreign Host", { headers: { Host: "elsewhere.example" } }, "403"],
  ])("%s is refused before the socket opens", async (_, options, status) => {
    await expect(new RawSocket(await newKernelId(), options).open()).rejects.toThrow(status);
  });

  test("no socket for a kernel that is not there; one for events", async () => {
    await expect(new RawSocket("nobody").open()).rejects.toThrow("404");
    const events = new WebSocket(`ws://127.0.0.1:${server.port}/api/events/subscribe?token=${server.token}`);
    await new Promise((resolve) => events.on("open", resolve));
    events.terminate();
  });
});

describe("REST", () => {
  test.each<[string, object, number, string]>([
    ["no token", { token: null }, 401, "a token is needed"],
    ["a wrong token", { token: "0123" }, 403, "the token is not the one"],
    [
      "a foreign Origin",
      { headers: { Origin: "https://elsewhere.example" } },
      403,
      "requests from https://elsewhere.example are refused",
    ],
    ["an opaque Origin", { headers: { Origin: "null" } }, 403, "requests from null are refused"],
    [
      "a foreign Host",
      { headers: { Host: "elsewhere.example" } },
      403,
      "the host elsewhere.example is not this server",
    ],
  ])("%s is refused", async (_, options, status, message) => {
    const refused = await ask("/api/kernels", options);
    expect(refused.status).toBe(status);
    expect(refused.body.message).toContain(message);
  });

  test("the server's own origin and others on this machine are let in, and the token in the query", async () => {
    for (const origin of [server.url.slice(0, -1), "http://localhost:5173"]) {
      expect((await ask("/api", { headers: { Origin: origin } })).status).toBe(200);
    }
    expect((await ask(`/api/status?token=${server.token}`, { token: null })).body).toHaveProperty("started");
    expect((await ask("/api/me")).body).toHaveProperty("identity.username");
  });

  test.each<[string, string, string | undefined, number, string]>([
    ["GET", "/api/nothing", undefined, 404, "there is nothing at /api/nothing"],
    ["GET", "/", undefined, 404, "there is nothing"],
    ["GET", "/%zz", undefined, 400, "the address is malformed"],
    ["PUT", "/api/kernels", undefined, 405, "allowed: GET, POST"],
    ["POST", "/api/kernels", "{", 400, "the body is not JSON"],
    ["POST", "/api/kernels", "[1]", 400, "expected an object"],
    ["POST", "/api/kernels", '{"name":5}', 400, "name: expected string"],
    ["POST", "/api/kernels", '{"name":"other"}', 404, "there is no kernel other"],
    ["POST", "/api/kernels", `"${"x".repeat(1024 * 1024)}"`, 413, "the body has more than 1048576 bytes"],
    ["POST", "/api/kernels/none/restart", undefined, 404, "there is no kernel none"],
    ["DELETE", "/api/kernels/none", undefined, 404, "there is no kernel none"],
    ["POST", "/api/sessions", "{}", 400, "path: expected"],
    ["POST", "/api/sessions", '{"path":"a","kernel":{"id":"none"}}', 404, "there is no kernel none"],
    ["PATCH", "/api/sessions/none", "{}", 404, "there is no session none"],
    ["GET", "/api/terminals", undefined, 404, "this server has no terminals"],
    ["GET", "/api/kernelspecs/other", undefined, 404, "there is no kernel specification other"],
    ["PUT", "/api/contents/note.txt", "{}", 405, "allowed: GET"],
    ["GET", "/api/contents/..%2fsecret.txt", undefined, 404, "there is no file"],
    ["GET", "/api/contents/%2e%2e/secret.txt", undefined, 404, ""],
    ["GET", "/api/contents/way-out.txt", undefined, 404, "there is no file way-out.txt"],
    ["GET", "/api/contents/.hidden", undefined, 404, "there is no file .hidden"],
    ["GET", "/api/contents/a%00b", undefined, 404, "there is no file"],
    ["GET", "/api/contents/bad.ipynb", undefined, 400, "nbformat, the version of the format, is missing"],
  ])("%s %s is answered with a message", async (method, path, body, status, message) => {
    const answered = await ask(path, { method, ...(body === undefined ? {} : { body }) });
    expect(answered.status).toBe(status);
    expect(answered.body.message).toContain(message);
    expect(answered.body).toHaveProperty("reason", null);
  });

  test("files below the root are shown", async () => {
    const list = await ask("/api/contents/");
    expect(list.body).toMatchObject({ type: "directory", format: "json", writable: false });
    const names = (list.body.content as { name: string }[]).map(({ name }) => name);
    expect(names).toEqual(["bad.ipynb", "bytes.bin", "n.ipynb", "note.txt", "way-out.txt"]);
    expect((await ask("/api/contents/note.txt")).body).toMatchObject({ format: "text", content: "∀x" });
    expect((await ask("/api/contents/bytes.bin")).body).toMatchObject({ format: "base64", content: "//4=" });
    expect((await ask("/api/contents/n.ipynb")).body).toMatchObject({
      type: "notebook",
      content: { nbformat: 4 },
    });
    expect((await ask("/api/contents/n.ipynb?content=0")).body).toMatchObject({ content: null });
  });

  test("interrupt and restart of a kernel that does nothing", async () => {
    const id = await newKernelId();
    expect((await ask(`/api/kernels/${id}/interrupt`, { method: "POST" })).status).toBe(204);
    expect((await ask(`/api/kernels/${id}/restart`, { method: "POST" })).body).toMatchObject({
      id,
      execution_state: "idle",
    });
    expect((await ask(`/api/kernels/${id}`, { method: "DELETE" })).status).toBe(204);
  });
});

test("requests that arrive during a restart are answered by the new session", async () => {
  inThread = true;
  const id = await newKernelId();
  const socket = await new RawSocket(id).open();
  await socket.answered(socket.request("execute_request", { code: "define Marsh 1" }));
  const restarted = ask(`/api/kernels/${id}/restart`, { method: "POST" });
  const held = Array.from({ length: 20 }, () => socket.request("execute_request", { code: "recall" }));
  expect((await restarted).status).toBe(200);
  const counts: unknown[] = [];
  for (const request of held) counts.push((await socket.answered(request)).content.execution_count);
  // Some may have come before the restart had begun and ended with the old session; the rest count from 1.
  const first = counts.lastIndexOf(1);
  expect(first).toBeGreaterThanOrEqual(0);
  expect(counts.slice(first)).toEqual(Array.from({ length: 20 - first }, (_, index) => index + 1));
});

test("there is a bound on the number of kernels", async () => {
  const statuses: number[] = [];
  while (statuses.at(-1) !== 503 && statuses.length < 100) {
    statuses.push((await ask("/api/kernels", { method: "POST" })).status);
  }
  expect(statuses).toHaveLength(65);
});

test("a port that is taken is said so by the system's code", async () => {
  const start = startServer({ port: server.port, createEvaluator: () => new ScriptEvaluator() });
  await expect(start).rejects.toMatchObject({ code: "EADDRINUSE" });
});

test("closing a server closes its sockets and kernels", async () => {
  const evaluator = new ScriptEvaluator();
  const own = await startServer({ createEvaluator: () => evaluator });
  const kernels = kernelManagerFor(own);
  const kernel = await kernels.startNew();
  await kernel.info;
  expect(own.token).toMatch(/^[0-9a-f]{64}$/);
  await own.close();
  expect(evaluator.closed).toBe(true);
  kernels.dispose();
});
