/** Notebooks: reading with clear problems, running, and writing as Jupyter's own writer spells them. */
import { describe, expect, test } from "vitest";
import { executeNotebook, findForeignKernel } from "../kernel/notebook/execute.ts";
import type { CodeCell, Notebook } from "../kernel/notebook/nbformat.ts";
import { readNotebook } from "../kernel/notebook/read.ts";
import { writeNotebook } from "../kernel/notebook/write.ts";
import { MemoryClient, MemoryKernel } from "../kernel/transport/memory.ts";
import { ScriptEvaluator } from "./support/kernel-script.ts";

const code = (source: string | string[], more: object = {}) => ({
  cell_type: "code",
  metadata: {},
  source,
  outputs: [],
  execution_count: null,
  ...more,
});
const prose = (source: string, more: object = {}) => ({
  cell_type: "markdown",
  metadata: {},
  source,
  ...more,
});
const notebookOf = (cells: unknown[], more: object = {}) => ({
  nbformat: 4,
  nbformat_minor: 5,
  metadata: {},
  cells,
  ...more,
});

function read(value: unknown): Notebook {
  const result = readNotebook(JSON.stringify(value));
  if ("problem" in result) throw new Error(result.problem);
  return result.notebook;
}

describe("reading", () => {
  const problemOf = (text: string) => {
    const result = readNotebook(text);
    return "problem" in result ? result.problem : null;
  };
  const problem = (value: unknown) => problemOf(JSON.stringify(value));

  test("keeps keys that the format does not name, and passes over a byte order mark", () => {
    const value = notebookOf(
      [
        code("x", { id: "a1", extra: [1] }),
        prose("y", { attachments: { "a.png": { "image/png": "aA==" } } }),
      ],
      {
        more: { "1": 2 },
      },
    );
    expect(readNotebook(`\uFEFF${JSON.stringify(value)}`)).toEqual({ notebook: value });
  });

  test.each([0, 1, 2, 3, 4, 5, 6])("takes minor version %s", (minor) => {
    expect(problem(notebookOf([code("x")], { nbformat_minor: minor }))).toBeNull();
  });

  test.each<[string, unknown, string]>([
    ["a list", [], "not a notebook: the file is JSON, but no object"],
    ["null", null, "the file is JSON, but no object"],
    ["no version", { cells: [] }, "nbformat, the version of the format, is missing"],
    ["nbformat 3", { nbformat: 3, worksheets: [] }, "old format nbformat 3; convert it to nbformat 4 first"],
    ["nbformat 5", notebookOf([], { nbformat: 5 }), "unknown format nbformat 5"],
    ["a version that is text", notebookOf([], { nbformat: "4" }), 'unknown format nbformat "4"'],
    [
      "a minor version below 0",
      notebookOf([], { nbformat_minor: -1 }),
      "nbformat_minor: expected a whole number but received -1",
    ],
    ["no cells", { nbformat: 4, nbformat_minor: 5, metadata: {} }, "cells"],
    ["metadata that are a list", notebookOf([], { metadata: [] }), "metadata: expected an object"],
    [
      "an unknown type of cell",
      notebookOf([prose("a"), code("b", { cell_type: "query" })]),
      'cell 2 is malformed: cell_type is "query"',
    ],
    ["a cell without type", notebookOf([{ source: "" }]), "cell 1 is malformed: cell_type is missing"],
    ["a cell that is a number", notebookOf([prose("a"), 7]), "cell 2 is malformed"],
    [
      "a source that is a number",
      notebookOf([code("a", { source: 7 })]),
      "cell 1 is malformed: source: expected text or a list of lines",
    ],
    [
      "a code cell without outputs",
      notebookOf([{ ...code("a"), outputs: undefined }]),
      "cell 1 is malformed: outputs",
    ],
    [
      "an output of no type",
      notebookOf([code("a", { outputs: [{ output_type: "pyout" }] })]),
      "cell 1 is malformed: outputs.0.output_type",
    ],
    [
      "an id with a blank",
      notebookOf([code("a", { id: "a b" })]),
      "cell 1 is malformed: id: expected 1 to 64 of",
    ],
  ])("%s is a problem in words", (_, value, expected) => {
    expect(problem(value)).toContain(expected);
  });

  test("what is not JSON is a problem in words", () => {
    expect(problemOf("relation R")).toContain("the file is not JSON");
    expect(problemOf("")).toContain("the file is not JSON");
  });

  test("absurd depth is a problem and not a stack overflow", () => {
    const deep = `${"[".repeat(50_000)}${"]".repeat(50_000)}`;
    const text = JSON.stringify(notebookOf([], { metadata: { deep: 0 } })).replace(
      '"deep":0',
      `"deep":${deep}`,
    );
    expect(problemOf(text)).toContain("nested more than 200 levels deep");
  });
});

describe("writing", () => {
  // Spelled by hand after the rules in nbformat's own source (nbformat/v4/nbjson.py and rwbase.py): json.dumps with
  // sort_keys, indent 1, ensure_ascii off; lines by str.splitlines; transient keys left out.
  test("has sorted keys, one space for each level, text in lines, a newline at the end", () => {
    const notebook = read(
      notebookOf(
        [
          code("a\nb", {
            id: "c1",
            metadata: { trusted: true, tags: [] },
            execution_count: 2,
            outputs: [
              { output_type: "stream", name: "stdout", text: "x\r\ny\u2028z\n" },
              {
                output_type: "display_data",
                metadata: { "10": 1, "9": {} },
                data: {
                  "text/plain": "∀\n",
                  "image/png": "aA==\n",
                  "application/json": { b: "1\n2", a: null },
                },
              },
            ],
          }),
          prose("", { id: "c2" }),
        ],
        { metadata: { orig_nbformat: 3, title: "é" } },
      ),
    );
    expect(writeNotebook(notebook)).toBe(`{
 "cells": [
  {
   "cell_type": "code",
   "execution_count": 2,
   "id": "c1",
   "metadata": {
    "tags": []
   },
   "outputs": [
    {
     "name": "stdout",
     "output_type": "stream",
     "text": [
      "x\\r\\n",
      "y\u2028",
      "z\\n"
     ]
    },
    {
     "data": {
      "application/json": {
       "a": null,
       "b": "1\\n2"
      },
      "image/png": "aA==\\n",
      "text/plain": [
       "∀\\n"
      ]
     },
     "metadata": {
      "10": 1,
      "9": {}
     },
     "output_type": "display_data"
    }
   ],
   "source": [
    "a\\n",
    "b"
   ]
  },
  {
   "cell_type": "markdown",
   "id": "c2",
   "metadata": {},
   "source": []
  }
 ],
 "metadata": {
  "title": "é"
 },
 "nbformat": 4,
 "nbformat_minor": 5
}
`);
  });

  test("what was written is read back and written the same", () => {
    const text = writeNotebook(read(notebookOf([code("a\nb"), prose("c")])));
    const again = readNotebook(text);
    expect("notebook" in again && writeNotebook(again.notebook)).toBe(text);
  });
});

describe("running", () => {
  async function execute(value: unknown) {
    const kernel = new MemoryKernel({ evaluator: new ScriptEvaluator() });
    const seen: number[] = [];
    const executed = await executeNotebook(read(value), new MemoryClient(kernel.connect()), (_, number) =>
      seen.push(number),
    );
    await kernel.close();
    return { ...executed, seen, cells: executed.notebook.cells as CodeCell[] };
  }

  test("fills outputs, counts and metadata; cells that are blank or prose are left alone", async () => {
    const old = { outputs: [{ output_type: "stream", name: "stdout", text: "old" }], execution_count: 9 };
    const { cells, failed, notebook, seen } = await execute(
      notebookOf(
        [prose("# A"), code(["begin p one\n", "print two"]), code(" \n", old), code("update p three", old)],
        {
          metadata: { title: "T" },
        },
      ),
    );
    expect(failed).toEqual([]);
    expect(seen).toEqual([2, 4]);
    expect(cells.map((cell) => cell.execution_count)).toEqual([undefined, 1, null, 2]);
    expect(cells[1]!.outputs).toEqual([
      { output_type: "display_data", data: { "text/plain": "three" }, metadata: {} },
      { output_type: "stream", name: "stdout", text: "two\n" },
    ]);
    expect(cells[2]!.outputs).toEqual([]);
    expect(cells[3]!.outputs).toEqual([]);
    expect(notebook.metadata).toMatchObject({
      title: "T",
      kernelspec: { name: "twoplace", display_name: "Twoplace" },
      language_info: { name: "twoplace", file_extension: ".twoplace" },
    });
    expect("problem" in readNotebook(writeNotebook(notebook))).toBe(false);
  });

  test("goes on after a cell that fails, and says which did", async () => {
    const { cells, failed } = await execute(
      notebookOf([
        code("fail one"),
        code("print on"),
        prose("x"),
        code("fail two"),
        code("fail three", { metadata: { tags: ["raises-exception"] } }),
      ]),
    );
    expect(failed).toEqual([
      { number: 1, ename: "Failure", evalue: "one" },
      { number: 4, ename: "Failure", evalue: "two" },
    ]);
    expect(cells[0]!.outputs[0]).toMatchObject({ output_type: "error", evalue: "one" });
    expect(cells[1]!.execution_count).toBe(2);
  });

  test("gives ids that are missing or doubled, the same in each run; none before minor version 5", async () => {
    const value = notebookOf([code("a", { id: "same" }), code("b"), code("b"), code("c", { id: "same" })]);
    const ids = (await execute(value)).cells.map((cell) => cell.id);
    expect(ids[0]).toBe("same");
    expect(new Set(ids).size).toBe(4);
    for (const id of ids) expect(id).toMatch(/^[a-zA-Z0-9-_]{1,64}$/);
    expect((await execute(value)).cells.map((cell) => cell.id)).toEqual(ids);
    const early = await execute({ ...notebookOf([code("a")]), nbformat_minor: 4 });
    expect(early.cells[0]).not.toHaveProperty("id");
  });

  test("a notebook for another kernel is recognised", () => {
    const kernelspec = { name: "python3", display_name: "Python 3" };
    expect(findForeignKernel(read(notebookOf([], { metadata: { kernelspec } })))).toBe("python3");
    expect(findForeignKernel(read(notebookOf([])))).toBeNull();
  });
});
