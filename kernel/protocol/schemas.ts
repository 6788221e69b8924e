/**
 * What messages look like, checked at run time. Requests are read leniently: unknown keys are dropped and what the
 * protocol makes optional gets its default. What the kernel sends is described strictly, so that tests that lay these
 * schemas over all traffic notice a surplus key as well as a missing one.
 */
import * as v from "valibot";
import type {
  Channel,
  Header,
  PublicationContent,
  PublicationType,
  ReplyContent,
  ReplyType,
  RequestChannel,
  RequestContent,
  RequestType,
} from "./messages.ts";

const count = v.pipe(v.number(), v.safeInteger(), v.minValue(0));
/** Any object; not `v.record`, which lets arrays pass. */
const json = v.custom<Readonly<Record<string, unknown>>>(
  (value) => typeof value === "object" && value !== null && !Array.isArray(value),
  (issue) => `expected an object but received ${issue.received}`,
);

/** A header of version 5.x. Keys of later versions are kept if their values are plain, since replies echo it. */
export const headerSchema = v.pipe(
  v.looseObject({
    msg_id: v.pipe(v.string(), v.nonEmpty()),
    msg_type: v.pipe(v.string(), v.nonEmpty(), v.maxLength(200)),
    session: v.string(),
    username: v.string(),
    date: v.exactOptional(v.string()),
    version: v.pipe(v.string(), v.regex(/^5(\.\d+)*$/, "expected a version 5.x")),
    subshell_id: v.exactOptional(v.nullable(v.string())),
  }),
  v.transform(
    (header): Header =>
      Object.fromEntries(
        Object.entries(header).filter(([, value]) => value === null || typeof value !== "object"),
      ) as unknown as Header,
  ),
);

export const parentHeaderSchema = v.union([headerSchema, v.strictObject({})]);

const historyFlags = { output: v.optional(v.boolean(), false), raw: v.optional(v.boolean(), true) };
const atMost = v.optional(v.nullable(count), null);
const historyQuery = v.variant("hist_access_type", [
  v.object({ hist_access_type: v.literal("tail"), ...historyFlags, n: atMost }),
  v.object({
    hist_access_type: v.literal("range"),
    ...historyFlags,
    session: v.optional(v.pipe(v.number(), v.safeInteger()), 0),
    start: v.optional(count, 0),
    stop: atMost,
  }),
  v.object({
    hist_access_type: v.literal("search"),
    ...historyFlags,
    pattern: v.optional(v.string(), "*"),
    unique: v.optional(v.boolean(), false),
    n: atMost,
  }),
]);

const commData = { comm_id: v.string(), data: v.optional(json, {}) };

/** The content of each request; parsing fills in the defaults. */
export const requestContents = {
  kernel_info_request: json,
  execute_request: v.pipe(
    v.object({
      code: v.string(),
      silent: v.optional(v.boolean(), false),
      store_history: v.optional(v.boolean(), true),
      user_expressions: v.optional(v.record(v.string(), v.string()), {}),
      allow_stdin: v.optional(v.boolean(), true),
      stop_on_error: v.optional(v.boolean(), true),
    }),
    v.transform((content) => ({ ...content, store_history: content.store_history && !content.silent })),
  ),
  complete_request: v.object({ code: v.string(), cursor_pos: count }),
  inspect_request: v.object({
    code: v.string(),
    cursor_pos: count,
    detail_level: v.optional(v.picklist([0, 1]), 0),
  }),
  is_complete_request: v.object({ code: v.string() }),
  history_request: historyQuery,
  comm_info_request: v.object({ target_name: v.exactOptional(v.nullable(v.string())) }),
  comm_open: v.object({ ...commData, target_name: v.string() }),
  comm_msg: v.object(commData),
  comm_close: v.object(commData),
  shutdown_request: v.object({ restart: v.optional(v.boolean(), false) }),
  interrupt_request: json,
  input_reply: v.object({ value: v.string() }),
} satisfies { [T in RequestType]: v.GenericSchema<unknown, RequestContent<T>> };

/** On which channels each request is understood. */
export const requestChannels: { readonly [T in RequestType]: readonly RequestChannel[] } = {
  kernel_info_request: ["shell", "control"],
  execute_request: ["shell"],
  complete_request: ["shell"],
  inspect_request: ["shell"],
  is_complete_request: ["shell"],
  history_request: ["shell"],
  comm_info_request: ["shell"],
  comm_open: ["shell"],
  comm_msg: ["shell"],
  comm_close: ["shell"],
  shutdown_request: ["shell", "control"],
  interrupt_request: ["control"],
  input_reply: ["stdin"],
};

const errorParts = { ename: v.string(), evalue: v.string(), traceback: v.array(v.string()) };
const errorReply = v.strictObject({ status: v.literal("error"), ...errorParts });
/** An object by a table of MIME types; every value of ours is text. */
const mimeBundle = v.record(v.pipe(v.string(), v.regex(/^[\w.+-]+\/[\w.+-]+$/)), v.string());
const displayContent = v.strictObject({
  data: mimeBundle,
  metadata: json,
  transient: v.strictObject({ display_id: v.pipe(v.string(), v.nonEmpty()) }),
});
const closedComm = v.strictObject({ comm_id: v.string(), data: json });

/** The content of each reply; a reply with an error has the same form for all of them, except for `execute_reply`. */
export const replyContents = {
  kernel_info_reply: v.union([
    v.strictObject({
      status: v.literal("ok"),
      protocol_version: v.pipe(v.string(), v.regex(/^5\.\d+$/)),
      implementation: v.string(),
      implementation_version: v.string(),
      language_info: v.strictObject({
        name: v.string(),
        version: v.string(),
        mimetype: v.string(),
        file_extension: v.string(),
        pygments_lexer: v.string(),
      }),
      banner: v.string(),
      help_links: v.array(v.strictObject({ text: v.string(), url: v.string() })),
      supported_features: v.array(v.string()),
    }),
    errorReply,
  ]),
  execute_reply: v.union([
    v.strictObject({
      status: v.literal("ok"),
      execution_count: count,
      payload: v.array(v.never()),
      user_expressions: v.record(
        v.string(),
        v.union([v.strictObject({ status: v.literal("ok"), data: mimeBundle, metadata: json }), errorReply]),
      ),
    }),
    v.strictObject({ status: v.literal("error"), execution_count: count, ...errorParts }),
    v.strictObject({ status: v.literal("aborted"), execution_count: count }),
  ]),
  complete_reply: v.union([
    v.strictObject({
      status: v.literal("ok"),
      matches: v.array(v.string()),
      cursor_start: count,
      cursor_end: count,
      metadata: json,
    }),
    errorReply,
  ]),
  inspect_reply: v.union([
    v.strictObject({ status: v.literal("ok"), found: v.boolean(), data: mimeBundle, metadata: json }),
    errorReply,
  ]),
  is_complete_reply: v.union([
    v.strictObject({ status: v.picklist(["complete", "invalid", "unknown"]) }),
    v.strictObject({ status: v.literal("incomplete"), indent: v.string() }),
    errorReply,
  ]),
  history_reply: v.union([
    v.strictObject({
      status: v.literal("ok"),
      history: v.array(
        v.tuple([count, count, v.union([v.string(), v.tuple([v.string(), v.nullable(v.string())])])]),
      ),
    }),
    errorReply,
  ]),
  comm_info_reply: v.union([
    v.strictObject({
      status: v.literal("ok"),
      comms: v.record(v.string(), v.strictObject({ target_name: v.string() })),
    }),
    errorReply,
  ]),
  shutdown_reply: v.union([v.strictObject({ status: v.literal("ok"), restart: v.boolean() }), errorReply]),
  interrupt_reply: v.union([v.strictObject({ status: v.literal("ok") }), errorReply]),
} satisfies { [T in ReplyType]: v.GenericSchema<unknown, ReplyContent<T>> };

export const publicationContents = {
  status: v.strictObject({ execution_state: v.picklist(["starting", "busy", "idle", "dead"]) }),
  execute_input: v.strictObject({ code: v.string(), execution_count: count }),
  stream: v.strictObject({ name: v.picklist(["stdout", "stderr"]), text: v.string() }),
  display_data: displayContent,
  update_display_data: displayContent,
  error: v.strictObject(errorParts),
  comm_close: closedComm,
} satisfies { [T in PublicationType]: v.GenericSchema<unknown, PublicationContent<T>> };

const channels = ["shell", "control", "stdin", "iopub"] as const satisfies readonly Channel[];

/** A message in either direction, its content not looked at. */
export const messageSchema = v.object({
  channel: v.picklist(channels),
  header: headerSchema,
  parent_header: v.optional(v.union([parentHeaderSchema, v.null()]), {}),
  metadata: v.optional(json, {}),
  content: json,
  buffers: v.optional(v.array(v.instance(Uint8Array)), []),
});

/** The problems of a value, each with the path to it: `content.code: expected string but received 5`. */
export function describeIssues(issues: readonly v.BaseIssue<unknown>[], root: string): string {
  const said = issues.slice(0, 5).map((issue) => {
    const path = v.getDotPath(issue);
    const message = issue.message.replace(/^Invalid \w+: Expected/, "expected");
    return `${[root, path].filter((part) => part !== "" && part !== null).join(".")}: ${message}`;
  });
  if (issues.length > 5) said.push(`and ${issues.length - 5} more`);
  return said.join("; ");
}

/** Whether a string is the type of a request that the kernel understands. */
export function isRequestType(type: string): type is RequestType {
  return Object.hasOwn(requestContents, type);
}

/**
 * What is wrong with a message of ours (a reply or a publication), or null if nothing is. For tests and for
 * transports that want to check what they carry.
 */
export function findProblem(message: unknown): string | null {
  const envelope = v.safeParse(messageSchema, message);
  if (!envelope.success) return describeIssues(envelope.issues, "");
  const { channel, header, parent_header, content } = envelope.output;
  const type = header.msg_type;
  if (header.date === undefined) return "header.date: missing";
  if (channel === "iopub") {
    if (!Object.hasOwn(publicationContents, type)) return `${type} is no publication`;
    const result = v.safeParse(publicationContents[type as PublicationType], content);
    return result.success ? null : `${type}: ${describeIssues(result.issues, "content")}`;
  }
  if (parent_header === null || !("msg_id" in parent_header)) return `${type}: a reply without parent`;
  if (type !== parent_header.msg_type.replace(/_request$/, "_reply")) {
    return `${type} answers ${parent_header.msg_type}`;
  }
  // A request of an unknown type is answered with an error of the general form.
  const schema = Object.hasOwn(replyContents, type) ? replyContents[type as ReplyType] : errorReply;
  const result = v.safeParse(schema, content);
  return result.success ? null : `${type}: ${describeIssues(result.issues, "content")}`;
}
