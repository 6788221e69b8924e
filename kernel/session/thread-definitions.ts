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
  #claims = 0;

  /** The sources, in the order in which they ran. Earlier definitions of a name stay: others may rest on them. */
  get texts(): readonly string[] {
    return this.#texts;
  }

  add(results: readonly StatementResult[]): void {
    this.#texts.push(...results.filter(isDefinition).map((result) => result.text));
    this.#claims += results.filter(
      ({ statement }) => statement === "claim" || statement === "conjecture",
    ).length;
  }

  drop(index: number): void {
    this.#texts.splice(index, 1);
  }

  clear(): void {
    this.#texts = [];
    this.#claims = 0;
  }

  /** What is left when only the texts are, in words; claims, which are not run again, are forgotten thereby. */
  describeLoss(): string {
    const names = [...new Set(this.#texts.flatMap(namesIn))];
    const kept =
      names.length === 0
        ? "there were no earlier definitions to keep"
        : `definitions kept: ${names.join(", ")}`;
    const claims = this.#claims;
    this.#claims = 0;
    return claims === 0 ? kept : `${kept}; claims of earlier cells that are forgotten: ${claims}`;
  }
}

/** The names that a `relation` or `define` statement introduces; from its text, since no parser runs in this thread. */
function namesIn(text: string): string[] {
  const [, keyword, rest] = /^(relation|define)\s+([\s\S]*)$/.exec(text) ?? [];
  if (rest === undefined) return [];
  if (keyword === "define") return [rest.split(/\(|:=|\s/, 1)[0]!];
  return rest.split(",").map((part) => part.trim().split(/\s/, 1)[0]!);
}
