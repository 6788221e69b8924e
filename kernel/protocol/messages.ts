/**
 * The messages of the Jupyter protocol that the kernel reads or writes, one interface each, and the channels they
 * travel on. Source: "Messaging in Jupyter", version 5.5 (jupyter-client.readthedocs.io). `schemas.ts` checks the same
 * at run time.
 */

/** The version that the kernel speaks. Any 5.x is understood. */
export const PROTOCOL_VERSION = "5.5";

export type Channel = "shell" | "control" | "stdin" | "iopub";
/** The channels on which a client sends. */
export type RequestChannel = "shell" | "control" | "stdin";

export interface Header {
  readonly msg_id: string;
  readonly msg_type: string;
  readonly session: string;
  readonly username: string;
  /** ISO 8601; some clients leave it out. */
  readonly date?: string;
  readonly version: string;
  /** Null or absent: the main shell. The kernel has no other. */
  readonly subshell_id?: string | null;
}

type Json = Readonly<Record<string, unknown>>;

/** What every message is made of. */
export interface MessageOf<C extends Channel, T extends string, Content> {
  readonly channel: C;
  readonly header: Header & { readonly msg_type: T };
  /** The header of the request that caused the message, word for word; empty where none did. */
  readonly parent_header: Header | Readonly<Record<string, never>>;
  readonly metadata: Json;
  readonly content: Content;
  readonly buffers: readonly Uint8Array[];
}

// What clients send.

export type KernelInfoRequest = MessageOf<"shell" | "control", "kernel_info_request", Json>;

export interface ExecuteRequest
  extends MessageOf<
    "shell",
    "execute_request",
    {
      readonly code: string;
      /** Nothing goes to iopub but the status, and nothing into the history. */
      readonly silent: boolean;
      /** Whether the cell counts and is kept in the history; never when silent. */
      readonly store_history: boolean;
      /** Expressions for prose, by the client's own keys; evaluated after the code if it went well. */
      readonly user_expressions: Readonly<Record<string, string>>;
      /** Ignored: the kernel never asks for input. */
      readonly allow_stdin: boolean;
      /** After an error, execute requests that wait in the queue are answered with `aborted`. */
      readonly stop_on_error: boolean;
    }
  > {}

export interface CompleteRequest
  extends MessageOf<
    "shell",
    "complete_request",
    {
      readonly code: string;
      /** In code points. */
      readonly cursor_pos: number;
    }
  > {}

export interface InspectRequest
  extends MessageOf<
    "shell",
    "inspect_request",
    {
      readonly code: string;
      /** In code points. */
      readonly cursor_pos: number;
      readonly detail_level: 0 | 1;
    }
  > {}

export type IsCompleteRequest = MessageOf<"shell", "is_complete_request", { readonly code: string }>;

export type HistoryQuery =
  | {
      readonly hist_access_type: "tail";
      readonly output: boolean;
      readonly raw: boolean;
      readonly n: number | null;
    }
  | {
      readonly hist_access_type: "range";
      readonly output: boolean;
      readonly raw: boolean;
      /** 0 is the current session, −1 the one before. */
      readonly session: number;
      readonly start: number;
      /** One past the last line; null: to the end. */
      readonly stop: number | null;
    }
  | {
      readonly hist_access_type: "search";
      readonly output: boolean;
      readonly raw: boolean;
      /** A glob: `*` any characters, `?` one. */
      readonly pattern: string;
      readonly unique: boolean;
      readonly n: number | null;
    };
export type HistoryRequest = MessageOf<"shell", "history_request", HistoryQuery>;

export type CommInfoRequest = MessageOf<
  "shell",
  "comm_info_request",
  { readonly target_name?: string | null }
>;
export interface CommOpen
  extends MessageOf<
    "shell",
    "comm_open",
    { readonly comm_id: string; readonly target_name: string; readonly data: Json }
  > {}
export interface CommMsg
  extends MessageOf<"shell", "comm_msg", { readonly comm_id: string; readonly data: Json }> {}
export interface CommClose
  extends MessageOf<"shell", "comm_close", { readonly comm_id: string; readonly data: Json }> {}

export type ShutdownRequest = MessageOf<
  "shell" | "control",
  "shutdown_request",
  { readonly restart: boolean }
>;
export type InterruptRequest = MessageOf<"control", "interrupt_request", Json>;
export type InputReply = MessageOf<"stdin", "input_reply", { readonly value: string }>;

// What the kernel answers.

export interface ErrorContent {
  readonly ename: string;
  readonly evalue: string;
  readonly traceback: readonly string[];
}
/** The content of any reply that reports a failure. */
export interface ErrorReplyContent extends ErrorContent {
  readonly status: "error";
}

type Reply<C extends Channel, T extends string, Content> = MessageOf<C, T, Content | ErrorReplyContent>;

export type KernelInfoReply = Reply<
  "shell" | "control",
  "kernel_info_reply",
  {
    readonly status: "ok";
    readonly protocol_version: string;
    readonly implementation: string;
    readonly implementation_version: string;
    readonly language_info: LanguageInfo;
    readonly banner: string;
    readonly help_links: readonly { readonly text: string; readonly url: string }[];
    readonly supported_features: readonly string[];
  }
>;
export interface LanguageInfo {
  readonly name: string;
  readonly version: string;
  readonly mimetype: string;
  readonly file_extension: string;
  readonly pygments_lexer: string;
}

/** One entry of `user_expressions` in the reply. */
export type ExpressionReply =
  | { readonly status: "ok"; readonly data: Json; readonly metadata: Json }
  | ErrorReplyContent;

export interface ExecuteReply
  extends MessageOf<
    "shell",
    "execute_reply",
    | {
        readonly status: "ok";
        readonly execution_count: number;
        readonly payload: readonly never[];
        readonly user_expressions: Readonly<Record<string, ExpressionReply>>;
      }
    | (ErrorReplyContent & { readonly execution_count: number })
    | { readonly status: "aborted"; readonly execution_count: number }
  > {}

export type CompleteReply = Reply<
  "shell",
  "complete_reply",
  {
    readonly status: "ok";
    readonly matches: readonly string[];
    readonly cursor_start: number;
    readonly cursor_end: number;
    readonly metadata: Json;
  }
>;
export type InspectReply = Reply<
  "shell",
  "inspect_reply",
  { readonly status: "ok"; readonly found: boolean; readonly data: Json; readonly metadata: Json }
>;
export type IsCompleteReply = Reply<
  "shell",
  "is_complete_reply",
  | { readonly status: "complete" | "invalid" | "unknown" }
  | { readonly status: "incomplete"; readonly indent: string }
>;
/** Session, line, and the input, or the input with its output where outputs were asked for. */
export type HistoryEntry = readonly [number, number, string | readonly [string, string | null]];
export type HistoryReply = Reply<
  "shell",
  "history_reply",
  { readonly status: "ok"; readonly history: readonly HistoryEntry[] }
>;
export type CommInfoReply = Reply<
  "shell",
  "comm_info_reply",
  {
    readonly status: "ok";
    readonly comms: Readonly<Record<string, { readonly target_name: string }>>;
  }
>;
export type ShutdownReply = Reply<
  "shell" | "control",
  "shutdown_reply",
  { readonly status: "ok"; readonly restart: boolean }
>;
export type InterruptReply = Reply<"control", "interrupt_reply", { readonly status: "ok" }>;

// What the kernel publishes.

export type Status = MessageOf<
  "iopub",
  "status",
  { readonly execution_state: "starting" | "busy" | "idle" | "dead" }
>;
export type ExecuteInput = MessageOf<
  "iopub",
  "execute_input",
  { readonly code: string; readonly execution_count: number }
>;
export type Stream = MessageOf<
  "iopub",
  "stream",
  { readonly name: "stdout" | "stderr"; readonly text: string }
>;
interface DisplayContent {
  readonly data: Json;
  readonly metadata: Json;
  readonly transient: { readonly display_id: string };
}
export type DisplayData = MessageOf<"iopub", "display_data", DisplayContent>;
export type UpdateDisplayData = MessageOf<"iopub", "update_display_data", DisplayContent>;
export type ErrorMessage = MessageOf<"iopub", "error", ErrorContent>;
export type PublishedCommClose = MessageOf<
  "iopub",
  "comm_close",
  { readonly comm_id: string; readonly data: Json }
>;

export type Request =
  | KernelInfoRequest
  | ExecuteRequest
  | CompleteRequest
  | InspectRequest
  | IsCompleteRequest
  | HistoryRequest
  | CommInfoRequest
  | CommOpen
  | CommMsg
  | CommClose
  | ShutdownRequest
  | InterruptRequest
  | InputReply;
export type ReplyMessage =
  | KernelInfoReply
  | ExecuteReply
  | CompleteReply
  | InspectReply
  | IsCompleteReply
  | HistoryReply
  | CommInfoReply
  | ShutdownReply
  | InterruptReply;
export type Publication =
  | Status
  | ExecuteInput
  | Stream
  | DisplayData
  | UpdateDisplayData
  | ErrorMessage
  | PublishedCommClose;

export type RequestType = Request["header"]["msg_type"];
export type ReplyType = ReplyMessage["header"]["msg_type"];
export type PublicationType = Publication["header"]["msg_type"];

/** The content of a request, reply or publication of type `T`. */
export type RequestContent<T extends RequestType> = Extract<Request, { header: { msg_type: T } }>["content"];
export type ReplyContent<T extends ReplyType> = Extract<ReplyMessage, { header: { msg_type: T } }>["content"];
export type PublicationContent<T extends PublicationType> = Extract<
  Publication,
  { header: { msg_type: T } }
>["content"];

/** Any message, as transports carry it: the parts are known, the content is not. */
export interface Message {
  readonly channel: Channel;
  readonly header: Header;
  readonly parent_header: Header | Readonly<Record<string, never>>;
  readonly metadata: Json;
  readonly content: Json;
  readonly buffers: readonly Uint8Array[];
}
