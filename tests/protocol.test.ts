/**
 * The kernel's core through the in-memory transport: what is answered to each message, and in which order. The rules
 * are those of "Messaging in Jupyter" 5.5 (jupyter-client.readthedocs.io). All traffic is checked against the schemas.
 */
import { afterEach, beforeEach, describe, expect, test } from "vitest";
import { makeHeader } from "../kernel/protocol/core.ts";
import type { Message } from "../kernel/protocol/messages.ts";
import { MemoryClient, type MemoryConnection, MemoryKernel } from "../kernel/transport/memory.ts";
import { Recorder } from "./support/kernel-recorder.ts";
import { ScriptEvaluator } from "./support/kernel-script.ts";

let evaluator: ScriptEvaluator;
let kernel: MemoryKernel;
let client: MemoryClient;
let recorder: Recorder;
let shutdowns: boolean[];
let log: string[];

beforeEach(() => {
  evaluator = new ScriptEvaluator();
  shutdowns = [];
  log = [];
  recorder = new Recorder();
  kernel = new MemoryKernel({
    evaluator,
    onShutdown: (restart) => shutdowns.push(restart),
    log: (line) => log.push(line),
  });
  client = new MemoryClient(kernel.connect());
  client.onMessage = (message, direction) => recorder.record(message, direction);
});

afterEach(async () => {
  await kernel.close();
  expect(recorder.problems).toEqual([]);
});

/** The types of published messages, a status by its state. */
function types(published: readonly Message[]): unknown[] {
  return published.map(({ header, content }) => content.execution_state ?? header.msg_type);
}

describe("execute", () => {
  test("goes busy, input, outputs in order, reply, idle", async () => {
    const { reply, published, outputs } = await client.execute("print one\nshow two\nwarn three");
    expect(types(published)).toEqual(["busy", "execute_input", "stream", "display_data", "stream", "idle"]);
    expect(reply).toEqual({ status: "ok", execution_count: 1, payload: [], user_expressions: {} });
    expect(outputs).toEqual([
      { output_type: "stream", name: "stdout", text: "one\n" },
      { output_type: "display_data", data: { "text/plain": "two" }, metadata: {} },
      { output_type: "stream", name: "stderr", text: "three\n" },
    ]);
  });

  test("an error is one message and a reply that keeps the count", async () => {
    await client.execute("print one");
    const { reply, published, outputs } = await client.execute("fail so\nshow after");
    expect(types(published)).toEqual(["busy", "execute_input", "display_data", "error", "idle"]);
    expect(reply).toMatchObject({ status: "error", ename: "Failure", evalue: "so", execution_count: 2 });
    expect(outputs.at(-1)).toMatchObject({ output_type: "error", ename: "Failure", evalue: "so" });
  });

  test("a display is updated in place, also in the outputs of an earlier cell", async () => {
    const first = await client.execute("begin p working\nprint x\nupdate p done");
    expect(types(first.published)).toContain("update_display_data");
    expect(first.outputs).toEqual([
      { output_type: "display_data", data: { "text/plain": "done" }, metadata: {} },
      { output_type: "stream", name: "stdout", text: "x\n" },
    ]);
    const second = await client.execute("update p later");
    expect(second.outputs).toEqual([]);
    expect(first.outputs[0]).toMatchObject({ data: { "text/plain": "later" } });
  });

  test("the count rises only with what is stored; silent publishes nothing but the status", async () => {
    expect((await client.execute("print a")).reply.execution_count).toBe(1);
    const unstored = await client.execute("print b", { store_history: false });
    expect(unstored.reply.execution_count).toBe(1);
    expect(types(unstored.published)).toEqual(["busy", "execute_input", "stream", "idle"]);
    const silent = await client.execute("print c\nshow d\nfail e", { silent: true, store_history: true });
    expect(types(silent.published)).toEqual(["busy", "idle"]);
    expect(silent.reply).toMatchObject({ status: "error", execution_count: 1 });
    expect((await client.execute("print f")).reply.execution_count).toBe(2);
    const { reply } = await client.request("history_request", { hist_access_type: "tail", n: 10 });
    expect(reply.history).toEqual([
      [1, 1, "print a"],
      [1, 2, "print f"],
    ]);
  });

  test("user expressions are evaluated one by one, even without code, but not after an error", async () => {
    await client.execute("define Marsh 1");
    const user_expressions = { good: "Marsh", bad: "Moor" };
    const { reply } = await client.execute("", { user_expressions });
    expect(reply).toMatchObject({
      status: "ok",
      user_expressions: {
        good: { status: "ok", data: { "text/plain": "<Marsh>" } },
        bad: { status: "error", ename: "Mistakes", evalue: "no name Moor" },
      },
    });
    expect((await client.execute("fail x", { user_expressions })).reply).not.toHaveProperty(
      "user_expressions",
    );
  });

  test("after an error, the execute requests that wait are aborted, and nothing else", async () => {
    const stop = { stop_on_error: true };
    const [failed, aborted, asked, alsoAborted] = await Promise.all([
      client.execute("fail x", stop),
      client.execute("print never", stop),
      client.request("is_complete_request", { code: "a" }),
      client.execute("print never", { stop_on_error: false }),
    ]);
    expect(failed.reply.status).toBe("error");
    expect(aborted.reply).toEqual({ status: "aborted", execution_count: 1 });
    expect(types(aborted.published)).toEqual(["busy", "idle"]);
    expect(asked.reply).toEqual({ status: "complete" });
    expect(alsoAborted.reply.status).toBe("aborted");
    expect((await client.execute("print again")).reply).toMatchObject({ status: "ok", execution_count: 2 });
  });

  test("an error without stop_on_error lets the queue run", async () => {
    const [failed, ran] = await Promise.all([client.execute("fail x"), client.execute("print y")]);
    expect([failed.reply.status, ran.reply.status]).toEqual(["error", "ok"]);
  });

  test("a mistake of ours is an error reply, and the kernel goes on", async () => {
    const { reply } = await client.execute("throw bug");
    expect(reply).toMatchObject({
      status: "error",
      ename: "InternalError",
      evalue: "bug",
      execution_count: 1,
    });
    expect((await client.execute("print on")).reply.status).toBe("ok");
  });
});

describe("control", () => {
  test("is never behind shell: an interrupt ends the cell that runs, and earlier definitions stay", async () => {
    await client.execute("define Marsh 1");
    const running = client.execute("pause");
    const queued = client.execute("recall");
    const info = await client.request("kernel_info_request", {}, "control");
    expect(info.reply.status).toBe("ok");
    const { reply } = await client.request("interrupt_request", {}, "control");
    expect(reply).toEqual({ status: "ok" });
    expect((await running).reply).toMatchObject({ status: "error", ename: "Interrupted" });
    expect((await queued).outputs).toEqual([{ output_type: "stream", name: "stdout", text: "Marsh" }]);
  });

  test("an interrupt is harmless when nothing runs", async () => {
    await client.request("interrupt_request", {}, "control");
    expect((await client.execute("print x")).reply.status).toBe("ok");
  });

  test.each([
    ["control", false],
    ["control", true],
    ["shell", true],
  ] as const)("shutdown on %s, restart %s: answered first, then ended", async (channel, restart) => {
    const { reply, published } = await client.request("shutdown_request", { restart }, channel);
    expect(reply).toEqual({ status: "ok", restart });
    expect(types(published)).toEqual(["busy", "idle"]);
    await new Promise((resolve) => setTimeout(resolve, 5));
    expect(shutdowns).toEqual([restart]);
    expect(evaluator.closed).toBe(true);
    await expect(client.execute("print x")).rejects.toThrow("the kernel has ended");
  });

  test("a cell that runs at the end is answered, and what waits is aborted", async () => {
    const running = client.execute("pause");
    const queued = client.execute("print x");
    await new Promise((resolve) => setTimeout(resolve, 5));
    await kernel.close();
    expect((await running).reply).toMatchObject({ status: "error", ename: "Interrupted" });
    expect((await queued).reply.status).toBe("aborted");
  });
});

test("kernel_info says what language this is", async () => {
  const { reply, published } = await client.request("kernel_info_request");
  expect(types(published)).toEqual(["busy", "idle"]);
  expect(reply).toMatchObject({
    status: "ok",
    protocol_version: "5.5",
    implementation: "twoplace",
    language_info: { name: "twoplace", mimetype: "text/x-twoplace", file_extension: ".twoplace" },
  });
  expect(reply.language_info).not.toHaveProperty("codemirror_mode");
});

describe("complete and inspect", () => {
  beforeEach(async () => {
    await client.execute("define Marsh 1\ndefine Moor 2");
  });

  test("places are code points, a cursor at 0 and one beyond the end are valid", async () => {
    const code = "𝔸 Mo";
    const at = (cursor_pos: number) => client.request("complete_request", { code, cursor_pos });
    expect((await at(4)).reply).toMatchObject({
      status: "ok",
      matches: ["Moor"],
      cursor_start: 2,
      cursor_end: 4,
      metadata: { _jupyter_types_experimental: [{ start: 2, end: 4, text: "Moor", type: "name" }] },
    });
    expect((await at(99)).reply).toMatchObject({ matches: ["Moor"], cursor_end: 4 });
    expect((await at(0)).reply).toMatchObject({ status: "ok", cursor_start: 0, cursor_end: 0 });
  });

  test("a miss is found: false with status ok", async () => {
    const inspect = async (code: string, cursor_pos: number, more = {}) =>
      (await client.request("inspect_request", { code, cursor_pos, ...more })).reply;
    expect(await inspect("Moor", 0)).toEqual({
      status: "ok",
      found: true,
      data: { "text/plain": "Moor, detail 0" },
      metadata: {},
    });
    expect(await inspect("𝔸 Moor", 3, { detail_level: 1 })).toMatchObject({
      data: { "text/plain": "Moor, detail 1" },
    });
    expect(await inspect("Fen", 2)).toEqual({ status: "ok", found: false, data: {}, metadata: {} });
  });
});

test("is_complete gives an indentation only where a cell goes on", async () => {
  const ask = async (code: string) => (await client.request("is_complete_request", { code })).reply;
  expect(await ask("{")).toEqual({ status: "incomplete", indent: "  " });
  expect(await ask("}")).toEqual({ status: "invalid" });
  expect(await ask("a")).toEqual({ status: "complete" });
});

describe("history", () => {
  const ask = async (content: Record<string, unknown>) =>
    (await client.request("history_request", { raw: true, output: false, ...content })).reply.history;

  beforeEach(async () => {
    for (const code of ["show a", "print b", "show a", "print [c]*"]) await client.execute(code);
  });

  test("tail, with n and with outputs", async () => {
    expect(await ask({ hist_access_type: "tail", n: 2 })).toEqual([
      [1, 3, "show a"],
      [1, 4, "print [c]*"],
    ]);
    expect(await ask({ hist_access_type: "tail", n: 2, output: true })).toEqual([
      [1, 3, ["show a", "a"]],
      [1, 4, ["print [c]*", null]],
    ]);
    expect(await ask({ hist_access_type: "tail", n: 0 })).toEqual([]);
    expect(await ask({ hist_access_type: "tail", n: 99 })).toHaveLength(4);
  });

  test("range, from start to before stop, of the current or a numbered session", async () => {
    const range = { hist_access_type: "range", start: 2, stop: 4 };
    const expected = [
      [1, 2, "print b"],
      [1, 3, "show a"],
    ];
    expect(await ask({ ...range, session: 0 })).toEqual(expected);
    expect(await ask({ ...range, session: 1 })).toEqual(expected);
    expect(await ask({ ...range, session: -1 })).toEqual([]);
    expect(await ask({ hist_access_type: "range", session: 0, start: 4 })).toEqual([[1, 4, "print [c]*"]]);
  });

  test("search by globs, unique, n", async () => {
    const search = { hist_access_type: "search" };
    expect(await ask({ ...search, pattern: "show*", unique: false })).toHaveLength(2);
    expect(await ask({ ...search, pattern: "show*", unique: true })).toEqual([[1, 3, "show a"]]);
    expect(await ask({ ...search, pattern: "print ?" })).toEqual([[1, 2, "print b"]]);
    expect(await ask({ ...search, pattern: "*]*" })).toEqual([[1, 4, "print [c]*"]]);
    expect(await ask({ ...search, pattern: "*", n: 1 })).toEqual([[1, 4, "print [c]*"]]);
    expect(await ask({ ...search, pattern: "b" })).toEqual([]);
  });
});

describe("comms", () => {
  test("there are none; one that is opened is closed, the rest is ignored", async () => {
    expect((await client.request("comm_info_request", {})).reply).toEqual({ status: "ok", comms: {} });
    const comm = { comm_id: "c1", data: {} };
    const opened = await client.request("comm_open", { ...comm, target_name: "somewhere" });
    expect(types(opened.published)).toEqual(["busy", "comm_close", "idle"]);
    expect(opened.published[1]!.content).toEqual({ comm_id: "c1", data: {} });
    expect(types((await client.request("comm_msg", comm)).published)).toEqual(["busy", "idle"]);
    expect(types((await client.request("comm_close", comm)).published)).toEqual(["busy", "idle"]);
  });
});

describe("malformed messages", () => {
  let raw: MemoryConnection;
  let requests: number;

  beforeEach(() => {
    raw = kernel.connect();
    requests = 0;
  });

  const messageOf = (type: string, content: unknown, more: object = {}) => ({
    channel: "shell",
    header: { ...makeHeader(type, "raw", "test"), ...more },
    parent_header: {},
    metadata: {},
    content,
    buffers: [],
  });
  const exchange = async (message: object) => {
    requests += 1;
    expect(raw.send(message)).toBeNull();
    return (await raw.next("shell")).content;
  };

  afterEach(async () => {
    // Every request went busy and idle, and the kernel still works.
    const states: unknown[] = [];
    while (states.length < 2 * requests) states.push((await raw.next("iopub")).content.execution_state);
    expect(states).toEqual(Array.from({ length: requests }, () => ["busy", "idle"]).flat());
    expect((await client.execute("print fine")).reply.status).toBe("ok");
  });

  test("content that breaks the schema is answered with what was expected where", async () => {
    const reply = await exchange(messageOf("execute_request", { code: 5, silent: "no" }));
    expect(reply).toMatchObject({ status: "error", ename: "MalformedRequest", execution_count: 0 });
    expect(reply.evalue).toBe(
      "execute_request: content.code: expected string but received 5; " +
        'content.silent: expected boolean but received "no"',
    );
    const inspected = await exchange(messageOf("inspect_request", { code: "x", cursor_pos: -1 }));
    expect(inspected).toMatchObject({ status: "error", ename: "MalformedRequest" });
    expect(inspected.evalue).toContain("content.cursor_pos");
  });

  test("an unknown request gets the reply of its name, on a channel it does not belong to likewise", async () => {
    raw.send(messageOf("usage_request", {}));
    const reply = await raw.next("shell");
    expect(reply.header.msg_type).toBe("usage_reply");
    expect(reply.content).toMatchObject({ status: "error", ename: "UnknownRequest" });
    raw.send({ ...messageOf("execute_request", { code: "" }), channel: "control" });
    const refused = await raw.next("control");
    expect(refused.content).toMatchObject({ status: "error", ename: "WrongChannel" });
    requests = 2;
  });

  test("an unknown message that is no request is logged", async () => {
    expect(raw.send(messageOf("greeting", {}))).toBeNull();
    requests = 1;
    expect((await raw.next("iopub")).content.execution_state).toBe("busy");
    expect((await raw.next("iopub")).content.execution_state).toBe("idle");
    requests = 0;
    expect(log.join("\n")).toContain("greeting");
  });

  test("input that nobody asked for is ignored", () => {
    expect(raw.send({ ...messageOf("input_reply", { value: "x" }), channel: "stdin" })).toBeNull();
  });

  test("what has no readable header is given back as a problem", () => {
    const good = messageOf("kernel_info_request", {});
    expect(raw.send(null)).toContain("expected Object but received null");
    expect(raw.send({ ...good, channel: "shelf" })).toContain('received "shelf"');
    expect(raw.send({ ...good, channel: "iopub" })).toContain("clients do not send on iopub");
    expect(raw.send({ ...good, header: { ...good.header, msg_id: 7 } })).toContain("header.msg_id");
    expect(raw.send({ ...good, header: { ...good.header, version: "4.1" } })).toContain("version 5.x");
    expect(raw.send({ ...good, content: [] })).toContain("content");
  });

  test("headers of other 5.x versions are accepted and echoed", async () => {
    const message = messageOf(
      "is_complete_request",
      { code: "x" },
      { subshell_id: null, version: "5.0", extra: 1 },
    );
    const { date, ...header } = message.header;
    requests = 1;
    raw.send({ ...message, header });
    const reply = await raw.next("shell");
    expect(reply.parent_header).toEqual(header);
    expect(reply.content).toEqual({ status: "complete" });
    expect(date).toBeDefined();
  });
});

test("published messages reach every client, replies only the one that asked", async () => {
  const other = kernel.connect();
  const seen: string[] = [];
  other.onMessage = (message) => seen.push(`${message.channel} ${message.header.msg_type}`);
  await client.execute("print x");
  expect(seen).toEqual(["iopub status", "iopub execute_input", "iopub stream", "iopub status"]);
  other.close();
  await client.execute("print y");
  expect(seen).toHaveLength(4);
});

test("the recorder of these tests notices what breaks a schema or the order", () => {
  const wrong = new Recorder();
  const header = makeHeader("status", "s", "u");
  const parent_header = makeHeader("execute_request", "s", "u");
  const base = { channel: "iopub", header, parent_header, metadata: {} };
  wrong.record({ ...base, content: { execution_state: "busy", extra: 1 } }, "received");
  wrong.record({ ...base, content: { execution_state: "tired" } }, "received");
  wrong.record(
    { ...base, channel: "shell", content: { code: 1 }, header: parent_header, parent_header: {} },
    "sent",
  );
  wrong.record({ ...base, content: {} }, "sent");
  expect(wrong.problems).toEqual([
    expect.stringContaining("content.extra"),
    expect.stringContaining('received "tired"'),
    expect.stringContaining("content.code"),
    "sent: status is no request",
    "execute_request: statuses busy, tired",
  ]);
});
