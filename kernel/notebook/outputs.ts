/** What a kernel publishes for a cell, gathered as the outputs that a notebook stores. */
import type { ErrorContent } from "../protocol/messages.ts";
import type { DisplayOutput, Output } from "./nbformat.ts";

/** As much of a published message as outputs need; messages of any client library fit. */
export interface PublishedMessage {
  readonly header: { readonly msg_type: string };
  readonly content: unknown;
}

/** A display that a later message may change in place. */
interface Shown {
  output_type: "display_data" | "execute_result";
  data: DisplayOutput["data"];
  metadata: DisplayOutput["metadata"];
}

/**
 * Gathers outputs over all cells of a session. Lists that were handed out change in place when a display of an earlier
 * cell is updated.
 */
export class OutputCollector {
  #outputs: Output[] = [];
  /** Displays by id: one id may be shown in several places. */
  readonly #displays = new Map<string, Shown[]>();

  /** Begins with a new cell; its outputs appear in the list returned. */
  startCell(): Output[] {
    this.#outputs = [];
    return this.#outputs;
  }

  /** Takes a message of the iopub channel; those that bring no output are passed over. */
  take(message: PublishedMessage): void {
    const content = message.content as Record<string, unknown>;
    switch (message.header.msg_type) {
      case "stream":
        this.#addStream(content.name as string, content.text as string);
        break;
      case "error": {
        const { ename, evalue, traceback } = content as unknown as ErrorContent;
        this.#outputs.push({ output_type: "error", ename, evalue, traceback });
        break;
      }
      case "execute_result":
      case "display_data":
        this.#addDisplay(message.header.msg_type, content);
        break;
      case "update_display_data":
        for (const shown of this.#displays.get(displayIdOf(content) ?? "") ?? []) {
          shown.data = content.data as DisplayOutput["data"];
          shown.metadata = content.metadata as DisplayOutput["metadata"];
        }
        break;
    }
  }

  #addStream(name: string, text: string): void {
    const last = this.#outputs.at(-1);
    if (last?.output_type === "stream" && last.name === name) {
      this.#outputs[this.#outputs.length - 1] = { ...last, text: `${last.text as string}${text}` };
    } else this.#outputs.push({ output_type: "stream", name, text });
  }

  #addDisplay(type: Shown["output_type"], content: Record<string, unknown>): void {
    const shown: Shown = {
      output_type: type,
      data: content.data as DisplayOutput["data"],
      metadata: content.metadata as DisplayOutput["metadata"],
    };
    const id = displayIdOf(content);
    if (id !== null) this.#displays.set(id, [...(this.#displays.get(id) ?? []), shown]);
    const count = content.execution_count as number | null;
    this.#outputs.push(
      (type === "execute_result" ? Object.assign(shown, { execution_count: count }) : shown) as Output,
    );
  }
}

function displayIdOf(content: Record<string, unknown>): string | null {
  const transient = content.transient as { display_id?: unknown } | undefined;
  return typeof transient?.display_id === "string" ? transient.display_id : null;
}
