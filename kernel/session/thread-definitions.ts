/** The sources of the definitions that a session has made, kept outside the thread that holds them. */
import type { StatementResult } from "./evaluator.ts";

/** Whether a result is that of a statement which declares or names something. */
export function isDefinition(result: Partial<StatementResult> | undefined): result is StatementResult {
  return (
    (result?.statement === "relation" || result?.statement === "define") && typeof result.text === "string"
  );
}

export class DefinitionLog {
  #texts: string[] = [];

  /** The sources, in the order in which they ran. Earlier definitions of a name stay: others may rest on them. */
  get texts(): readonly string[] {
    return this.#texts;
  }

  add(results: readonly StatementResult[]): void {
    this.#texts.push(...results.filter(isDefinition).map((result) => result.text));
  }

  drop(index: number): void {
    this.#texts.splice(index, 1);
  }

  clear(): void {
    this.#texts = [];
  }

  /** Which names are there, in words. */
  describe(): string {
    const names = [...new Set(this.#texts.flatMap(namesIn))];
    if (names.length === 0) return "there were no earlier definitions to keep";
    return `definitions kept: ${names.join(", ")}`;
  }
}

/** The names that a `relation` or `define` statement introduces; from its text, since no parser runs in this thread. */
function namesIn(text: string): string[] {
  const [, keyword, rest] = /^(relation|define)\s+([\s\S]*)$/.exec(text) ?? [];
  if (rest === undefined) return [];
  if (keyword === "define") return [rest.split(/\(|:=|\s/, 1)[0]!];
  return rest.split(",").map((part) => part.trim().split(/\s/, 1)[0]!);
}
