/**
 * An evaluator that acts out a small script instead of reasoning, so that tests of the protocol do not depend on
 * theories. A cell is a list of lines:
 *
 * | line              | does                                                                    |
 * | ---               | ---                                                                     |
 * | `show TEXT`       | displays TEXT under a new id                                            |
 * | `begin ID TEXT`   | displays TEXT under an id                                               |
 * | `update ID TEXT`  | puts TEXT in its place                                                  |
 * | `print TEXT`      | writes a line to stdout                                                 |
 * | `warn TEXT`       | writes a line to stderr                                                 |
 * | `define NAME …`   | remembers NAME, as a definition whose text is the line                  |
 * | `claim TEXT`      | makes a claim                                                           |
 * | `recall`          | prints the names that are remembered                                    |
 * | `fail TEXT`       | the cell goes on and ends with an error                                 |
 * | `spin`            | keeps the thread busy until it is interrupted                           |
 * | `pause`           | waits for an interrupt without keeping the thread busy                  |
 * | `deaf TEXT`       | prints text, then keeps the thread busy and never looks at an interrupt  |
 * | `throw TEXT`      | throws, as a mistake of ours would                                      |
 * | `crash`           | fails outside of any call, which ends a worker                          |
 * | `exit`            | ends the thread at once                                                 |
 * | `hoard`           | takes memory until there is none                                        |
 */
import type {
  CellEvent,
  CellOutcome,
  Completeness,
  Completion,
  Evaluator,
  ExpressionOutcome,
  MimeBundle,
  StatementResult,
} from "../../kernel/session/evaluator.ts";

type Show = (event: CellEvent) => void;

export class ScriptEvaluator implements Evaluator {
  readonly #isInterrupted: () => boolean;
  #ownFlag = false;
  #names: string[] = [];
  #displays = 0;
  closed = false;

  constructor(options: { isInterrupted: () => boolean } = { isInterrupted: () => false }) {
    this.#isInterrupted = () => options.isInterrupted() || this.#ownFlag;
  }

  async runCell(code: string, show: Show): Promise<CellOutcome> {
    this.#ownFlag = false;
    const results: StatementResult[] = [];
    let failure: string | null = null;
    for (const line of code.split("\n")) {
      const [, verb = "", rest = ""] = /^(\S*) ?(.*)$/.exec(line) ?? [];
      if (verb === "fail") failure = rest;
      else if (verb !== "") await this.#act(verb, rest, show, results);
      if (this.#isInterrupted()) return failed("Interrupted", "interrupted", line, results);
    }
    return failure === null ? { status: "ok", results } : failed("Failure", failure, code, results);
  }

  async #act(verb: string, rest: string, show: Show, results: StatementResult[]): Promise<void> {
    switch (verb) {
      case "show":
        this.#display(`d${++this.#displays}`, rest, false, show);
        results.push(resultOf("show", rest));
        break;
      case "begin":
      case "update": {
        const [id = "", ...words] = rest.split(" ");
        this.#display(id, words.join(" "), verb === "update", show);
        break;
      }
      case "print":
      case "warn":
        show({ kind: "stream", name: verb === "print" ? "stdout" : "stderr", text: `${rest}\n` });
        break;
      case "define": {
        const result = resultOf("define", `define ${rest}`);
        this.#names.push(rest.split(" ")[0]!);
        results.push(result);
        this.#display(`d${++this.#displays}`, rest, false, show, { twoplace: result });
        break;
      }
      case "claim":
        results.push(resultOf("claim", `claim ${rest}`));
        break;
      case "recall":
        show({ kind: "stream", name: "stdout", text: this.#names.join(" ") });
        break;
      case "spin":
        while (!this.#isInterrupted());
        break;
      case "pause":
        while (!this.#isInterrupted()) await new Promise((resolve) => setTimeout(resolve, 1));
        break;
      case "deaf":
        show({ kind: "stream", name: "stdout", text: rest });
        for (;;);
      case "throw":
        throw new Error(rest);
      case "crash":
        setImmediate(() => {
          throw new Error("a mistake outside of any call");
        });
        await new Promise(() => undefined);
        break;
      case "exit":
        process.exit(7);
        break;
      case "hoard": {
        const kept: number[][] = [];
        for (;;) kept.push(Array.from({ length: 100_000 }, (_, index) => index + kept.length));
      }
      default:
        show({ kind: "stream", name: "stderr", text: `no such line: ${verb}\n` });
    }
  }

  #display(displayId: string, text: string, update: boolean, show: Show, metadata = {}): void {
    show({ kind: "display", displayId, update, data: { "text/plain": text }, metadata });
  }

  async evaluateExpression(expression: string): Promise<ExpressionOutcome> {
    if (this.#names.includes(expression)) {
      return { status: "ok", data: { "text/plain": `<${expression}>` }, metadata: {} };
    }
    const evalue = `no name ${expression}`;
    return { status: "error", ename: "Mistakes", evalue, traceback: [evalue] };
  }

  /** Completes the word before the cursor to the remembered names. */
  async complete(code: string, cursor: number): Promise<Completion> {
    const letters = Array.from(code).slice(0, cursor);
    const from = letters.lastIndexOf(" ") + 1;
    const word = letters.slice(from).join("");
    const names = this.#names.filter((name) => name.startsWith(word));
    return { from, to: cursor, matches: names.map((text) => ({ text, type: "name" })) };
  }

  /** Explains the word around the cursor if it is a remembered name. */
  async inspect(code: string, cursor: number, detail: 0 | 1): Promise<MimeBundle | null> {
    const letters = Array.from(code);
    const before = letters.slice(0, cursor).join("").split(" ").at(-1)!;
    const after = letters.slice(cursor).join("").split(" ")[0]!;
    const word = before + after;
    return this.#names.includes(word) ? { "text/plain": `${word}, detail ${detail}` } : null;
  }

  async isComplete(code: string): Promise<Completeness> {
    if (code.endsWith("{")) return { status: "incomplete", indent: "  " };
    return { status: code.includes("}") ? "invalid" : "complete" };
  }

  interrupt(): void {
    this.#ownFlag = true;
  }

  async reset(): Promise<void> {
    this.#names = [];
  }

  async close(): Promise<void> {
    this.closed = true;
    this.interrupt();
  }
}

function resultOf(statement: string, text: string): StatementResult {
  return {
    statement,
    text,
    verdict: null,
    summary: text,
    steps: 0,
    data: {},
    evidence: null,
    diagnostics: [],
  };
}

function failed(ename: string, evalue: string, place: string, results: StatementResult[]): CellOutcome {
  return { status: "error", ename, evalue, traceback: [place, `${ename}: ${evalue}`], results };
}
