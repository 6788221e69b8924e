/**
 * Notebooks in Jupyter's format, major version 4, minor versions 0 to 5. Source: the JSON schemas of the package
 * nbformat (nbformat.readthedocs.io). Keys that the schemas do not name are kept.
 */
import * as v from "valibot";

/** Text, in one string or as a list of its lines. */
export type MultilineString = string | readonly string[];
export type Metadata = Readonly<Record<string, unknown>>;

export interface DisplayOutput {
  readonly output_type: "display_data";
  readonly data: Readonly<Record<string, unknown>>;
  readonly metadata: Metadata;
}
export interface ResultOutput {
  readonly output_type: "execute_result";
  readonly data: Readonly<Record<string, unknown>>;
  readonly metadata: Metadata;
  readonly execution_count: number | null;
}
export interface StreamOutput {
  readonly output_type: "stream";
  readonly name: string;
  readonly text: MultilineString;
}
export interface ErrorOutput {
  readonly output_type: "error";
  readonly ename: string;
  readonly evalue: string;
  readonly traceback: readonly string[];
}
export type Output = DisplayOutput | ResultOutput | StreamOutput | ErrorOutput;

interface CellBase {
  /** From minor version 5 on. */
  readonly id?: string | undefined;
  readonly metadata: Metadata;
  readonly source: MultilineString;
}
export interface CodeCell extends CellBase {
  readonly cell_type: "code";
  readonly outputs: readonly Output[];
  readonly execution_count: number | null;
}
export interface TextCell extends CellBase {
  readonly cell_type: "markdown" | "raw";
  readonly attachments?: Readonly<Record<string, Metadata>> | undefined;
}
export type Cell = CodeCell | TextCell;

export interface Notebook {
  readonly nbformat: 4;
  readonly nbformat_minor: number;
  readonly metadata: Metadata;
  readonly cells: readonly Cell[];
}

const multiline = v.union([v.string(), v.array(v.string())], "expected text or a list of lines");
/** Any object; not `v.record`, which lets arrays pass. */
const metadata = v.custom<Metadata>(
  (value) => typeof value === "object" && value !== null && !Array.isArray(value),
  (issue) => `expected an object but received ${issue.received}`,
);
const executionCount = v.nullable(v.pipe(v.number(), v.safeInteger(), v.minValue(0)));
/** Values are text, except under JSON's own MIME types. */
const mimeBundle = v.pipe(
  metadata,
  v.check(
    (bundle) => Object.entries(bundle).every(([type, value]) => isJsonType(type) || v.is(multiline, value)),
    "expected text, or a list of lines, under every MIME type but JSON's",
  ),
);

export const outputSchema = v.variant("output_type", [
  v.looseObject({ output_type: v.literal("display_data"), data: mimeBundle, metadata }),
  v.looseObject({
    output_type: v.literal("execute_result"),
    data: mimeBundle,
    metadata,
    execution_count: executionCount,
  }),
  v.looseObject({ output_type: v.literal("stream"), name: v.string(), text: multiline }),
  v.looseObject({
    output_type: v.literal("error"),
    ename: v.string(),
    evalue: v.string(),
    traceback: v.array(v.string()),
  }),
]);

const cellParts = {
  id: v.exactOptional(
    v.pipe(v.string(), v.regex(/^[a-zA-Z0-9-_]{1,64}$/, "expected 1 to 64 of A-Z a-z 0-9 - _")),
  ),
  metadata,
  source: multiline,
};
const attachments = v.exactOptional(v.record(v.string(), mimeBundle));

export const cellSchema = v.variant("cell_type", [
  v.looseObject({
    cell_type: v.literal("code"),
    ...cellParts,
    outputs: v.array(outputSchema),
    execution_count: executionCount,
  }),
  v.looseObject({ cell_type: v.literal("markdown"), ...cellParts, attachments }),
  v.looseObject({ cell_type: v.literal("raw"), ...cellParts, attachments }),
]);

/** All of a notebook but its version, which is looked at first, and its cells, which are looked at one by one. */
export const notebookSchema = v.looseObject({ metadata, cells: v.array(v.unknown()) });

/** Whether a MIME type is one whose values are JSON and not text. */
export function isJsonType(type: string): boolean {
  return type === "application/json" || (type.startsWith("application/") && type.endsWith("+json"));
}

/** Text from its lines. */
export function joinLines(text: MultilineString): string {
  return typeof text === "string" ? text : text.join("");
}
