/** Records the traffic of clients in tests and lays the schemas over all of it. */
import * as v from "valibot";
import {
  describeIssues,
  findProblem,
  isRequestType,
  messageSchema,
  requestContents,
} from "../../kernel/protocol/schemas.ts";

/** As much of a message as any client library shows. */
interface Seen {
  readonly channel: string;
  readonly header: { readonly msg_id: string; readonly msg_type: string };
  readonly parent_header: unknown;
  readonly content: unknown;
}

export class Recorder {
  readonly #problems: string[] = [];
  readonly #received: Seen[] = [];
  readonly #types = new Set<string>();
  #messages = 0;

  /** Records a message; what breaks a schema is reported by {@link problems}. */
  record(message: Seen, direction: "sent" | "received"): void {
    this.#messages += 1;
    this.#types.add(message.header.msg_type);
    if (direction === "received") this.#received.push(message);
    const problem = direction === "sent" ? findRequestProblem(message) : findProblem(plain(message));
    if (problem !== null) this.#problems.push(`${direction}: ${problem}`);
  }

  get messages(): number {
    return this.#messages;
  }

  /** The types of all messages so far. */
  get types(): ReadonlySet<string> {
    return this.#types;
  }

  /** What broke a schema; empty if nothing did. */
  get schemaProblems(): readonly string[] {
    return this.#problems;
  }

  /** What was wrong with messages, and with their order; empty if nothing was. Each request has an id of its own. */
  get problems(): readonly string[] {
    return [...this.#problems, ...this.#orderProblems()];
  }

  /** For each request: busy comes first, idle last, nothing twice, and at most one reply. */
  #orderProblems(): string[] {
    const byParent = new Map<string, Seen[]>();
    for (const message of this.#received) {
      const { msg_id } = message.parent_header as { msg_id?: string };
      if (msg_id !== undefined) byParent.set(msg_id, [...(byParent.get(msg_id) ?? []), message]);
    }
    return [...byParent.values()].flatMap((messages) => {
      const states = messages.flatMap(({ header, content }) =>
        header.msg_type === "status" ? [(content as { execution_state: string }).execution_state] : [],
      );
      const published = messages.filter((message) => message.channel === "iopub");
      const replies = messages.length - published.length;
      const type = (messages[0]!.parent_header as { msg_type: string }).msg_type;
      const problems: string[] = [];
      if (states.join() !== "busy,idle") problems.push(`${type}: statuses ${states.join(", ")}`);
      if (published[0]?.header.msg_type !== "status") problems.push(`${type}: busy is not first`);
      if (messages.at(-1)?.header.msg_type !== "status") problems.push(`${type}: idle is not last`);
      if (replies > 1) problems.push(`${type}: ${replies} replies`);
      return problems;
    });
  }
}

/** What is wrong with a request; requests that are malformed on purpose are not sent through a recorder. */
function findRequestProblem(message: Seen): string | null {
  const envelope = v.safeParse(messageSchema, plain(message));
  if (!envelope.success) return describeIssues(envelope.issues, "");
  const type = message.header.msg_type;
  if (!isRequestType(type)) return `${type} is no request`;
  const result = v.safeParse(requestContents[type], message.content);
  return result.success ? null : `${type}: ${describeIssues(result.issues, "content")}`;
}

/** Client libraries show buffers as views of several kinds; they are not looked at. */
function plain(message: Seen): object {
  return { ...message, buffers: [] };
}
