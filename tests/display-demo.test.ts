/** The demo notebooks: well formed, without outputs in the repository, and every cell runs without an error. */
import { readdirSync, readFileSync } from "node:fs";
import { join } from "node:path";
import { describe, expect, it } from "vitest";
import { notebookToHtml } from "../kernel/display/notebook-html.ts";
import { type CodeCell, joinLines } from "../kernel/notebook/nbformat.ts";
import { readNotebook } from "../kernel/notebook/read.ts";
import type { CellEvent, StatementResult } from "../kernel/session/evaluator.ts";
import { Session } from "../kernel/session/session.ts";
import { checkBundle } from "./support/bundles.ts";
import { readMarkup } from "./support/markup.ts";

const folder = join(import.meta.dirname, "..", "notebooks-demo");
const files = readdirSync(folder).filter((name) => name.endsWith(".ipynb"));

function readDemo(name: string) {
  const read = readNotebook(readFileSync(join(folder, name), "utf8"));
  if ("problem" in read) throw new Error(read.problem);
  return read.notebook;
}

interface Ran {
  readonly cell: CodeCell;
  readonly results: readonly StatementResult[];
  readonly events: readonly CellEvent[];
}

async function runDemo(name: string): Promise<readonly Ran[]> {
  const session = new Session({ isInterrupted: () => false });
  const ran: Ran[] = [];
  for (const cell of readDemo(name).cells) {
    if (cell.cell_type !== "code") continue;
    const events: CellEvent[] = [];
    const outcome = await session.runCell(joinLines(cell.source), (event) => events.push(event));
    expect(outcome.status === "error" ? outcome.traceback.join("\n") : "").toBe("");
    ran.push({ cell, results: outcome.results, events });
  }
  return ran;
}

describe("demo notebooks", () => {
  it("are five", () => {
    expect(files).toHaveLength(5);
  });

  it.each(files)("%s is of nbformat 4.5, for this kernel, without outputs", (name) => {
    const notebook = readDemo(name);
    expect(notebook.nbformat_minor).toBe(5);
    expect(notebook.metadata).toMatchObject({
      kernelspec: { name: "twoplace", display_name: "Twoplace", language: "twoplace" },
    });
    const ids = notebook.cells.map((cell) => cell.id);
    expect(new Set(ids).size).toBe(ids.length);
    for (const cell of notebook.cells) {
      expect(cell.id).toBeTruthy();
      if (cell.cell_type === "code") expect([cell.outputs, cell.execution_count]).toEqual([[], null]);
    }
  });

  it.each(files)("%s runs, and says the same when it runs again", async (name) => {
    const ran = await runDemo(name);
    const claims = ran.flatMap(({ results }) => results).filter(({ statement }) => statement === "claim");
    expect(claims.length).toBeGreaterThan(5);
    for (const { verdict, evidence } of claims) {
      expect(verdict).toBe("holds");
      expect(evidence).not.toBeNull();
    }
    const again = await runDemo(name);
    expect(again.map(({ results }) => results)).toEqual(ran.map(({ results }) => results));
    const bundles = (all: readonly Ran[]) =>
      all
        .flatMap(({ events }) => events)
        .flatMap((event) => (event.kind === "display" && "twoplace" in event.metadata ? [event.data] : []));
    expect(bundles(again)).toEqual(bundles(ran));
    for (const bundle of bundles(ran)) {
      checkBundle(bundle);
      // What LaTeX reads without packages for further alphabets (common practice); signs stand as commands.
      expect(bundle["text/latex"] ?? "").toMatch(/^[\n\u0020-\u007e\u00a0-\u00ff–]*$/);
    }
    const cells = ran.map(({ cell, events }) => ({
      ...cell,
      outputs: events.flatMap((event) =>
        event.kind === "display" ? [{ output_type: "display_data", data: event.data }] : [],
      ),
    }));
    const page = notebookToHtml({ cells }, name);
    const body = readMarkup(page.slice(page.indexOf("<body>"), page.indexOf("</html>")));
    expect(body.elements.filter(({ name: element }) => element === "section")).toHaveLength(ran.length);
  });

  // Numbers of unlabelled partial orders on 3 points: OEIS A000112. Fair sheets are permutations, and on 4 points
  // permutations have as many shapes as 4 has partitions: OEIS A000041.
  it.each([
    ["1-casting.ipynb", "models Schedule of size 3", 5],
    ["3-tower.ipynb", "models Fair of size 4", 5],
    ["3-tower.ipynb", "models Row of size 3", 1],
  ])("%s: %s finds as many as are known", async (name, text, count) => {
    const results = (await runDemo(name)).flatMap((ran) => ran.results);
    const { data } = results.find((result) => result.text === text)!;
    expect(data).toMatchObject({ complete: true });
    expect(data.models).toHaveLength(count);
  });

  // Semiorders: OEIS A006531, and A000108 up to isomorphism. Strict weak orders: A000670, and powers of 2.
  it.each([
    ["count Threshold up to 5", [1, 3, 19, 183, 2371], [1, 2, 5, 14, 42]],
    ["count Shelves up to 5", [1, 3, 13, 75, 541], [1, 2, 4, 8, 16]],
  ])("4-customers.ipynb: %s comes to the published numbers", async (text, labelled, unlabelled) => {
    const results = (await runDemo("4-customers.ipynb")).flatMap((ran) => ran.results);
    const bySize = (counts: readonly number[]) =>
      Object.fromEntries(counts.map((count, index) => [String(index + 1), count]));
    expect(results.find((result) => result.text === text)!.data).toEqual({
      labelled: bySize(labelled),
      unlabelled: bySize(unlabelled),
    });
  });
});

describe("inspection", () => {
  // The structure is an order, which needs the layout engine, and nothing has been run that would have loaded it.
  it.each<[string, 0 | 1, string]>([
    ["A", 1, "points 2 where R is { (1,2) }"],
    ["define", 0, "define"],
    ["T", 0, "serial"],
    ["T", 1, "signature"],
  ])("shows %s at detail %i in a new session", async (name, detail, expected) => {
    const session = new Session({ isInterrupted: () => false });
    const text =
      "define A := points 2 where R is { (1,2) }\ndefine T := { serial: ∀x ∃y Rxy }\ndescribe A\ndescribe T";
    const bundle = (await session.inspect(
      text,
      Array.from(text.slice(0, text.lastIndexOf(name))).length,
      detail,
    ))!;
    checkBundle(bundle);
    expect(bundle["text/plain"]).toContain(expected);
    expect(bundle["text/html"]!.includes("<img")).toBe(name === "A");
  });
});
