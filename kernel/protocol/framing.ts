/**
 * How messages become WebSocket frames and back. There are two framings; which one a socket uses is settled by its
 * subprotocol.
 *
 * `v1` (subprotocol `v1.kernel.websocket.jupyter.org`): one binary frame
 *
 * | bytes          | content                                                                                       |
 * | ---            | ---                                                                                           |
 * | 8              | n, the number of offsets, unsigned, little-endian                                             |
 * | 8 · n          | offsets from the beginning of the frame, unsigned, little-endian; the last is its total length |
 * | between them   | channel, header, parent header, metadata, content (JSON but for the channel), then buffers     |
 *
 * `legacy` (no subprotocol): one text frame with the message as a JSON object; with buffers one binary frame
 *
 * | bytes          | content                                                                                       |
 * | ---            | ---                                                                                           |
 * | 4              | n, the number of parts, unsigned, big-endian                                                  |
 * | 4 · n          | where each part begins, unsigned, big-endian                                                  |
 * | the rest       | the parts: the message as JSON, then buffers                                                  |
 */
import type { Message } from "./messages.ts";

export const V1_SUBPROTOCOL = "v1.kernel.websocket.jupyter.org";

export type Framing = "v1" | "legacy";

/** What a frame held. Nothing is known of the parts but that they are JSON. */
export interface DecodedFrame {
  readonly channel: unknown;
  readonly header: unknown;
  readonly parent_header: unknown;
  readonly metadata: unknown;
  readonly content: unknown;
  readonly buffers: readonly Uint8Array[];
}

export type Decoded = { readonly frame: DecodedFrame } | { readonly problem: string };

/** The parts before the buffers in a frame of `v1`. */
const FIXED_PARTS = ["channel", "header", "parent_header", "metadata", "content"] as const;
/** More parts than any client sends; bounds the work that a forged count can cause. */
const MOST_PARTS = 10_000;

const utf8 = new TextDecoder("utf-8", { fatal: true });

/** Writes a message as a frame: text where the framing has text, else bytes. */
export function encodeFrame(message: Message, framing: Framing): string | Uint8Array {
  return framing === "v1" ? encodeV1(message) : encodeLegacy(message);
}

/** Reads a frame. Whatever the bytes, the answer is a frame or a problem said in words; nothing is thrown. */
export function decodeFrame(data: string | Uint8Array, framing: Framing): Decoded {
  try {
    if (framing === "v1") {
      if (typeof data === "string") return { problem: "a text frame, where the subprotocol has binary ones" };
      return { frame: decodeV1(data) };
    }
    return { frame: typeof data === "string" ? readLegacyText(data, []) : decodeLegacyBinary(data) };
  } catch (error) {
    if (error instanceof MalformedFrame) return { problem: error.message };
    throw error;
  }
}

/** Unwinds the reading of a frame; never leaves this file. */
class MalformedFrame extends Error {}

function encodeV1(message: Message): Uint8Array {
  const parts: Uint8Array[] = [
    Buffer.from(message.channel),
    ...[message.header, message.parent_header, message.metadata, message.content].map((part) =>
      Buffer.from(JSON.stringify(part)),
    ),
    ...message.buffers,
  ];
  const table = Buffer.alloc(8 * (parts.length + 2));
  table.writeBigUInt64LE(BigInt(parts.length + 1), 0);
  let offset = table.length;
  parts.forEach((part, index) => {
    table.writeBigUInt64LE(BigInt(offset), 8 * (index + 1));
    offset += part.length;
  });
  table.writeBigUInt64LE(BigInt(offset), 8 * (parts.length + 1));
  return Buffer.concat([table, ...parts]);
}

function decodeV1(data: Uint8Array): DecodedFrame {
  const view = new DataView(data.buffer, data.byteOffset, data.byteLength);
  const parts = cutV1(data, view);
  if (parts.length < FIXED_PARTS.length) {
    throw new MalformedFrame(`${parts.length} parts, where at least ${FIXED_PARTS.length} are needed`);
  }
  const [channel, ...rest] = parts as [Uint8Array, ...Uint8Array[]];
  const [header, parent, metadata, content] = FIXED_PARTS.slice(1).map((name, index) =>
    readJson(readText(rest[index]!, name), name),
  );
  return {
    channel: readText(channel, "channel"),
    header,
    parent_header: parent,
    metadata,
    content,
    buffers: rest.slice(FIXED_PARTS.length - 1),
  };
}

/** The parts between the offsets, which must not go back and must end with the frame. */
function cutV1(data: Uint8Array, view: DataView): Uint8Array[] {
  if (data.length < 8) throw new MalformedFrame(`${data.length} bytes, too few for a count`);
  const offsets = Number(view.getBigUint64(0, true));
  if (offsets > MOST_PARTS || 8 * (offsets + 1) > data.length) {
    throw new MalformedFrame(`a count of ${offsets} offsets in a frame of ${data.length} bytes`);
  }
  const parts: Uint8Array[] = [];
  let begin = -1;
  for (let index = 0; index < offsets; index++) {
    const offset = Number(view.getBigUint64(8 * (index + 1), true));
    const least = index === 0 ? 8 * (offsets + 1) : begin;
    if (offset < least || offset > data.length) {
      throw new MalformedFrame(`offset ${index + 1} is ${offset}, outside ${least} to ${data.length}`);
    }
    if (index > 0) parts.push(data.subarray(begin, offset));
    begin = offset;
  }
  if (offsets > 0 && begin !== data.length) {
    throw new MalformedFrame(`the last offset is ${begin}, the frame has ${data.length} bytes`);
  }
  return parts;
}

function encodeLegacy(message: Message): string | Uint8Array {
  const { buffers, ...rest } = message;
  if (buffers.length === 0) return JSON.stringify({ ...rest, buffers });
  const parts = [Buffer.from(JSON.stringify(rest)), ...buffers];
  const table = Buffer.alloc(4 * (parts.length + 1));
  table.writeUInt32BE(parts.length, 0);
  let offset = table.length;
  parts.forEach((part, index) => {
    table.writeUInt32BE(offset, 4 * (index + 1));
    offset += part.length;
  });
  return Buffer.concat([table, ...parts]);
}

function decodeLegacyBinary(data: Uint8Array): DecodedFrame {
  const view = new DataView(data.buffer, data.byteOffset, data.byteLength);
  if (data.length < 4) throw new MalformedFrame(`${data.length} bytes, too few for a count`);
  const count = view.getUint32(0);
  if (count < 1 || count > MOST_PARTS || 4 * (count + 1) > data.length) {
    throw new MalformedFrame(`a count of ${count} parts in a frame of ${data.length} bytes`);
  }
  const begins = Array.from({ length: count }, (_, index) => view.getUint32(4 * (index + 1)));
  const parts = begins.map((begin, index) => {
    const end = begins[index + 1] ?? data.length;
    const least = 4 * (count + 1);
    if (begin < least || end < begin || end > data.length) {
      throw new MalformedFrame(`part ${index + 1} goes from ${begin} to ${end} in ${data.length} bytes`);
    }
    return data.subarray(begin, end);
  });
  return readLegacyText(readText(parts[0]!, "message"), parts.slice(1));
}

function readLegacyText(text: string, buffers: readonly Uint8Array[]): DecodedFrame {
  const value = readJson(text, "message");
  if (typeof value !== "object" || value === null || Array.isArray(value)) {
    throw new MalformedFrame("message: JSON, but no object");
  }
  const { channel, header, parent_header, metadata, content } = value as Record<string, unknown>;
  return { channel, header, parent_header, metadata, content, buffers };
}

function readText(bytes: Uint8Array, name: string): string {
  try {
    return utf8.decode(bytes);
  } catch {
    throw new MalformedFrame(`${name}: not UTF-8`);
  }
}

function readJson(text: string, name: string): unknown {
  try {
    return JSON.parse(text);
  } catch (error) {
    throw new MalformedFrame(`${name}: not JSON (${(error as Error).message.slice(0, 80)})`);
  }
}
