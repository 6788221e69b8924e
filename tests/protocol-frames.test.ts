/** Frames: what is written is read back, by us and by Jupyter's own client; and no bytes at all make the kernel fall. */
import { deserialize, serialize } from "@jupyterlab/services/lib/kernel/serialize.js";
import fc from "fast-check";
import { afterAll, describe, expect, test } from "vitest";
import { makeHeader } from "../kernel/protocol/core.ts";
import { decodeFrame, encodeFrame, type Framing, V1_SUBPROTOCOL } from "../kernel/protocol/framing.ts";
import type { Message } from "../kernel/protocol/messages.ts";
import { MemoryClient, MemoryKernel } from "../kernel/transport/memory.ts";
import { Recorder } from "./support/kernel-recorder.ts";
import { ScriptEvaluator } from "./support/kernel-script.ts";

const seed = Number(process.env.TWOPLACE_SEED ?? Date.now() % 1_000_000_007);
console.info(`seed ${seed} (TWOPLACE_SEED=${seed} repeats the run)`);

const framings: readonly Framing[] = ["v1", "legacy"];
const message: Message = {
  channel: "shell",
  header: makeHeader("execute_request", "s", "u"),
  parent_header: {},
  metadata: { 𝔸: 1 },
  content: { code: "∀x ∃y Rxy\u0000", nested: [{ a: null }] },
  buffers: [],
};
const withBuffers: Message = {
  ...message,
  buffers: [Buffer.from([1, 2, 3]), Buffer.alloc(0), Buffer.from("∀")],
};

/** Jupyter's client takes and gives buffers that are not views into larger ones. */
function alone(bytes: Uint8Array): ArrayBuffer {
  return new Uint8Array(bytes).buffer;
}

describe.each(framings)("framing %s", (framing) => {
  const protocol = framing === "v1" ? V1_SUBPROTOCOL : "";

  test.each([
    ["without buffers", message],
    ["with buffers", withBuffers],
  ])("reads back what it wrote, %s", (_, sent) => {
    const decoded = decodeFrame(encodeFrame(sent, framing), framing);
    if ("problem" in decoded) throw new Error(decoded.problem);
    expect(decoded.frame.buffers.map((buffer) => Buffer.from(buffer))).toEqual(sent.buffers);
    expect({ ...decoded.frame, buffers: [] }).toEqual({ ...sent, buffers: [] });
  });

  test.each([
    ["without buffers", message],
    ["with buffers", withBuffers],
  ])("agrees with @jupyterlab/services in both directions, %s", (_, sent) => {
    const frame = encodeFrame(sent, framing);
    const theirs = deserialize(
      (typeof frame === "string" ? frame : alone(frame)) as ArrayBuffer,
      protocol,
    ) as unknown as Message;
    expect(theirs.content).toEqual(sent.content);
    expect(theirs.header).toEqual(sent.header);
    expect(theirs.channel).toBe("shell");
    expect(theirs.buffers.length).toBe(sent.buffers.length);

    const ours = { ...sent, buffers: sent.buffers.map(alone) } as unknown as Parameters<typeof serialize>[0];
    const bytes = serialize(ours, protocol);
    const decoded = decodeFrame(typeof bytes === "string" ? bytes : new Uint8Array(bytes), framing);
    if ("problem" in decoded) throw new Error(decoded.problem);
    expect(decoded.frame.content).toEqual(sent.content);
    expect(decoded.frame.buffers.map((buffer) => Buffer.from(buffer))).toEqual(sent.buffers);
  });
});

test("the layout of v1 is the published one, byte for byte", () => {
  // Counts and offsets by hand: 6 offsets are 8·7 = 56 bytes; "shell" has 5, the four objects 2 bytes each.
  const empty = { channel: "shell", header: {}, parent_header: {}, metadata: {}, content: {}, buffers: [] };
  const frame = Buffer.from(encodeFrame(empty as unknown as Message, "v1"));
  const words = Array.from({ length: 7 }, (_, index) => Number(frame.readBigUInt64LE(8 * index)));
  expect(words).toEqual([6, 56, 61, 63, 65, 67, 69]);
  expect(frame.subarray(56).toString()).toBe("shell{}{}{}{}");
});

describe("a malformed frame is a problem in words", () => {
  const v1 = (...words: (number | bigint)[]) => {
    const bytes = Buffer.alloc(8 * words.length);
    for (const [index, word] of words.entries()) bytes.writeBigUInt64LE(BigInt(word), 8 * index);
    return bytes;
  };
  const legacy = (...words: number[]) => {
    const bytes = Buffer.alloc(4 * words.length);
    for (const [index, word] of words.entries()) bytes.writeUInt32BE(word, 4 * index);
    return bytes;
  };
  test.each<[string, string | Uint8Array, Framing, string]>([
    ["text under v1", "{}", "v1", "a text frame"],
    ["nothing", Buffer.alloc(0), "v1", "0 bytes, too few for a count"],
    ["a count that is too large", v1(2n ** 63n), "v1", "offsets in a frame of 8 bytes"],
    ["no parts", v1(0), "v1", "0 parts, where at least 5 are needed"],
    ["an offset into the table", v1(1, 3), "v1", "offset 1 is 3, outside 16 to 16"],
    ["an offset that goes back", v1(3, 32, 32, 31), "v1", "offset 3 is 31, outside 32 to 32"],
    ["an offset past the end", v1(2, 24, 2n ** 53n + 1n), "v1", "outside 24 to 24"],
    [
      "parts that end before the frame",
      Buffer.concat([v1(1, 16), Buffer.from("x")]),
      "v1",
      "the frame has 17",
    ],
    [
      "parts that are not JSON",
      Buffer.concat([v1(6, 56, 57, 57, 57, 57, 57), Buffer.from("s")]),
      "v1",
      "header: not JSON",
    ],
    [
      "a channel that is not UTF-8",
      Buffer.concat([v1(6, 56, 57, 59, 61, 63, 65), Buffer.from([0xff]), Buffer.from("{}{}{}{}")]),
      "v1",
      "channel: not UTF-8",
    ],
    ["text that is not JSON", "{", "legacy", "message: not JSON"],
    ["JSON that is no object", "[1]", "legacy", "message: JSON, but no object"],
    ["bytes without a count", Buffer.alloc(3), "legacy", "3 bytes, too few for a count"],
    ["a count without parts", legacy(0), "legacy", "a count of 0 parts"],
    ["parts out of order", legacy(2, 12, 11), "legacy", "part 1 goes from 12 to 11"],
  ])("%s", (_, data, framing, problem) => {
    const decoded = decodeFrame(data, framing);
    expect(decoded).toEqual({ problem: expect.stringContaining(problem) });
  });
});

describe("random frames", () => {
  const kernel = new MemoryKernel({ evaluator: new ScriptEvaluator() });
  const client = new MemoryClient(kernel.connect());
  const recorder = new Recorder();
  const connection = kernel.connect();
  connection.onMessage = (received) => recorder.record(received, "received");
  afterAll(() => kernel.close());

  /** Decodes and, where that works, sends; the kernel must be there afterwards. */
  const feed = async (data: string | Uint8Array, framing: Framing): Promise<void> => {
    const decoded = decodeFrame(data, framing);
    if ("problem" in decoded) expect(decoded.problem).not.toBe("");
    else connection.send(decoded.frame);
    const { reply } = await client.request("kernel_info_request");
    expect(reply.status).toBe("ok");
  };
  const framing = fc.constantFrom(...framings);
  const json = fc.jsonValue({ maxDepth: 3 });
  const check = { seed, numRuns: 400 };

  test("any bytes and any text", async () => {
    const data = fc.oneof(
      fc.uint8Array({ maxLength: 200 }),
      fc.string({ maxLength: 200 }),
      json.map((value) => JSON.stringify(value)),
    );
    await fc.assert(fc.asyncProperty(data, framing, feed), check);
  });

  test("good frames with some bytes changed, cut or doubled", async () => {
    const change = fc.record({ at: fc.nat(2_000), byte: fc.nat(255), cut: fc.boolean() });
    const base = fc.constantFrom(
      ...[message, withBuffers].flatMap((sent) => framings.map((each) => ({ sent, each }))),
    );
    await fc.assert(
      fc.asyncProperty(
        base,
        fc.array(change, { minLength: 1, maxLength: 6 }),
        async ({ sent, each }, changes) => {
          let bytes = Buffer.from(encodeFrame(sent, each));
          for (const { at, byte, cut } of changes) {
            const place = at % bytes.length;
            if (cut && bytes.length > 1)
              bytes = Buffer.concat([bytes.subarray(0, place), bytes.subarray(place + 1)]);
            else bytes[place] = byte;
          }
          await feed(each === "legacy" && sent.buffers.length === 0 ? bytes.toString() : bytes, each);
        },
      ),
      check,
    );
  });

  test("messages that are well-formed up to one part, which is anything", async () => {
    const part = fc.constantFrom(
      "channel",
      "header",
      "parent_header",
      "metadata",
      "content",
      "header.msg_type",
    );
    const type = fc.constantFrom(
      "execute_request",
      "complete_request",
      "inspect_request",
      "is_complete_request",
      "history_request",
      "comm_info_request",
      "comm_open",
      "kernel_info_request",
      "interrupt_request",
    );
    const contentish = fc.dictionary(
      fc.constantFrom(
        "code",
        "cursor_pos",
        "detail_level",
        "hist_access_type",
        "n",
        "pattern",
        "silent",
        "user_expressions",
      ),
      fc.oneof(json, fc.constantFrom("tail", "search", "range", "x", 0, 1, true)),
    );
    await fc.assert(
      fc.asyncProperty(
        part,
        type,
        fc.oneof(json, contentish),
        framing,
        async (name, msg_type, value, each) => {
          const header = { ...makeHeader(msg_type, "s", "u") };
          const changed =
            name === "header.msg_type"
              ? { ...message, header: { ...header, msg_type: value } }
              : {
                  ...message,
                  header,
                  [name]: name === "channel" && each === "v1" ? JSON.stringify(value) : value,
                };
          await feed(encodeFrame(changed as unknown as Message, each), each);
        },
      ),
      check,
    );
    // Not their order: mutated frames repeat the id of the request they come from.
    expect(recorder.schemaProblems).toEqual([]);
    expect(recorder.messages).toBeGreaterThan(400);
  });

  test("very deep JSON", async () => {
    const deep = `${"[".repeat(100_000)}${"]".repeat(100_000)}`;
    const text = JSON.stringify({ ...message, header: { ...message.header, extra: 1 } });
    for (const place of ['"extra":1', '"code":']) {
      await feed(text.replace(place, `"extra":${deep}${place === '"code":' ? ',"code":' : ""}`), "legacy");
    }
  });
});
