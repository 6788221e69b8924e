/** `twoplace recheck`: a notebook that was run holds; whatever is changed in it is found, with its place. */
import { spawnSync } from "node:child_process";
import { mkdtempSync, readFileSync, rmSync, writeFileSync } from "node:fs";
import { tmpdir } from "node:os";
import { join, resolve } from "node:path";
import { deflateSync } from "node:zlib";
import { afterAll, beforeAll, describe, expect, it } from "vitest";
import { type Finding, recheckNotebook } from "../kernel/commands/recheck-notebook.ts";
import { prepareDrawing } from "../kernel/display/drawing.ts";
import { readNotebook } from "../kernel/notebook/read.ts";
import { changeAt, leavesOf } from "./support/leaves.ts";

const root = resolve(import.meta.dirname, "..");
const launcher = join(root, "kernel", "launch.mjs");
let folder: string;

function twoplace(...args: readonly string[]) {
  const { status, stdout, stderr } = spawnSync(process.execPath, [launcher, ...args], {
    cwd: folder,
    encoding: "utf8",
  });
  return { status, stdout, stderr };
}

function write(name: string, value: unknown): string {
  const file = join(folder, name);
  writeFileSync(file, typeof value === "string" ? value : JSON.stringify(value));
  return file;
}

/** Cell by cell. Orders of shifts in a bell workshop, in neutral notation. */
const SOURCES = [
  "define Order := { irr: ∀x ¬Rxx; trans: ∀x ∀y ∀z (Rxy ∧ Ryz → Rxz) }",
  "claim Order ⊨ ∀x ∀y (Rxy → ¬Ryx)\nconjecture Order ⊨ ∀x ∃y Rxy",
  "compare Order, {}\nindependence Order\nminimise Order + { asym: ∀x ∀y (Rxy → ¬Ryx) }\ndualise Order",
  "check-finite { some: ∃x ∃y Rxy; irr: ∀x ¬Rxx }\nmodels Order of size 2\ncount Order up to 3",
  "describe Order\nnormalise ∀x ∃y Rxy to prenex form",
  // Small graphs in which any two points are joined by one or two steps in one way only: the least has 50 points.
  "conjecture { irr: ∀x ¬Rxx; sym: ∀x ∀y (Rxy → Ryx); far: ∀x ∀y (x ≠ y → Rxy ∨ ∃z (Rxz ∧ Rzy)); three: ∀x ∀y ∀z ¬(Rxy ∧ Ryz ∧ Rzx); four: ∀x ∀y ∀z ∀w (Rxz ∧ Rzy ∧ Rxw ∧ Rwy → x = y ∨ z = w); many: ∀x ∃y ∃z ∃w ∃u (Rxy ∧ Rxz ∧ Rxw ∧ Rxu ∧ y ≠ z ∧ y ≠ w ∧ y ≠ u ∧ z ≠ w ∧ z ≠ u ∧ w ≠ u) } is consistent within 2000 steps",
  "define Pair := points 2 where R is { (1,2) }\nclaim Pair ⊨ ∃x ∃y Rxy",
  "conjecture Order + { asym: ∀x ∀y (Rxy → ¬Ryx) } is independent\nclaim Order is weaker than Order + { up: ∀x ∀y Rxy }",
  "check-finite Order + { up: ∀x ∃y Rxy }\nclaim Order + { up: ∀x ∃y Rxy } has no finite model\nderive Order + { up: ∀x ∃y Rxy } ⊨ ∀x ∃y Ryx",
];

interface Output {
  data: Record<string, string | string[]>;
  metadata: { twoplace: Record<string, unknown> };
}
interface Cells {
  metadata: Record<string, unknown>;
  cells: { source: string | string[]; outputs: Output[]; metadata: Record<string, unknown> }[];
}
let ran: string;

beforeAll(async () => {
  folder = mkdtempSync(join(tmpdir(), "twoplace-"));
  await prepareDrawing();
  const cells = SOURCES.map((source, index) => ({
    cell_type: "code",
    id: `cell-${index}`,
    metadata: {},
    source,
    outputs: [],
    execution_count: null,
  }));
  const prose = { cell_type: "markdown", id: "prose", metadata: {}, source: "Shifts." };
  write("draft.ipynb", { nbformat: 4, nbformat_minor: 5, metadata: {}, cells: [prose, ...cells] });
  expect(twoplace("run", "draft.ipynb", "--output", "ran.ipynb")).toMatchObject({ status: 0, stderr: "" });
  ran = readFileSync(join(folder, "ran.ipynb"), "utf8");
});
afterAll(() => rmSync(folder, { recursive: true }));

/**
 * What rechecking comes to after a change; cells are numbered as findings number them.
 * @param first the first cell that is looked at, besides the definitions
 * @param last the last one
 */
function recheckAfter(change: (notebook: Cells) => void, first = 1, last = 10): readonly Finding[] {
  const notebook = JSON.parse(ran) as Cells;
  for (const [index, cell] of notebook.cells.entries())
    if (index + 1 > 2 && (index + 1 < first || index + 1 > last))
      Object.assign(cell, { source: "", outputs: [] });
  change(notebook);
  const read = readNotebook(JSON.stringify(notebook));
  if ("problem" in read) throw new Error(read.problem);
  return recheckNotebook(read.notebook);
}

function resultOf(notebook: Cells, cell: number, output: number): Record<string, unknown> {
  return notebook.cells[cell - 1]!.outputs[output]!.metadata.twoplace;
}

function failuresIn(findings: readonly Finding[]): readonly Finding[] {
  return findings.filter(({ outcome }) => outcome === "does not hold" || outcome === "missing");
}

describe("a notebook as it was run", () => {
  it("holds, and each result is told", () => {
    const { status, stdout, stderr } = twoplace("recheck", "ran.ipynb");
    expect({ status, stderr }).toEqual({ status: 0, stderr: "" });
    const lines = stdout.trimEnd().split("\n");
    expect(lines[0]).toMatch(/^cell 3 {3}claim Order ⊨ .* holds +accepted$/);
    expect(lines[1]).toMatch(/^cell 3 {3}conjecture Order ⊨ .* fails +accepted$/);
    expect(lines.find((line) => line.includes("count Order"))).toMatch(
      /computed: counts are computed, not certified$/,
    );
    expect(lines.find((line) => line.includes("conjecture { irr"))).toMatch(/open +open$/);
    expect(lines.at(-1)).toBe(
      "17 results: 15 accepted, 1 open, 1 computed; 3 definitions and forms read again",
    );
  });

  it("holds without its definitions' outputs, and after `run` has written it once more", () => {
    expect(failuresIn(recheckAfter(({ cells }) => void cells[1]!.outputs.splice(0)))).toEqual([]);
    expect(twoplace("run", "ran.ipynb", "--output", "again.ipynb").status).toBe(0);
    expect(readFileSync(join(folder, "again.ipynb"), "utf8")).toBe(ran);
  });

  it("holds with evidence that is stored compressed", () => {
    const findings = recheckAfter((notebook) => {
      const result = resultOf(notebook, 3, 0);
      result.evidence = { deflate: deflateSync(JSON.stringify(result.evidence)).toString("base64") };
    });
    expect(failuresIn(findings)).toEqual([]);
  });

  it("is not disturbed by outputs of other programs, by blank cells, or by a mistake shown on purpose", () => {
    const findings = recheckAfter(({ cells }) => {
      cells[2]!.outputs.unshift({ output_type: "display_data", data: {}, metadata: {} } as never);
      const shown = { ...cells[2]!, source: "claim", outputs: [], metadata: { tags: ["raises-exception"] } };
      cells.push({ ...cells[2]!, source: " ", outputs: [] }, shown);
    });
    expect(failuresIn(findings)).toEqual([]);
  });
});

describe("edited cells", () => {
  const edited = /the cell has been edited since it was run|changed since it was run/;

  it.each([
    [3, "claim Order ⊨ ∀x ∀y (Rxy → ¬Ryx)", "claim Order ⊨ ∀x ∀y (Rxy → Ryx)"],
    [3, "conjecture Order", "claim Order"],
    [4, "compare Order, {}", "compare {}, Order"],
    [5, "of size 2", "of size 3"],
    [5, "up to 3", "up to 4"],
    [7, "within 2000 steps", "within 3000 steps"],
    [8, "claim Pair ⊨ ∃x ∃y Rxy", "claim Pair ⊨ ∃x Rxx"],
  ])("cell %i, from %s to %s", (cell, from, to) => {
    const failures = failuresIn(
      recheckAfter(({ cells }) => {
        const source = [cells[cell - 1]!.source].flat().join("");
        expect(source).toContain(from);
        cells[cell - 1]!.source = source.replace(from, to);
      }),
    );
    expect(failures.map((failure) => failure.cell)).toEqual([cell, cell]);
    expect(failures[0]).toMatchObject({ outcome: "missing" });
    expect(failures[0]!.text).toContain(to);
    expect(failures[1]!.text).toContain(from);
    expect(failures[1]!.remark).toMatch(edited);
  });

  it("an edited definition is found out in every cell that uses it, by the digest", () => {
    const failures = failuresIn(
      recheckAfter(({ cells }) => {
        cells[1]!.source = "define Order := { irr: ∀x ¬Rxx; trans: ∀x ∀y ∀z (Rxy ∧ Rzy → Rxz) }";
      }),
    );
    expect(new Set(failures.map(({ cell }) => cell))).toEqual(new Set([2, 3, 4, 5, 6, 9, 10]));
    const claim = failures.find(({ text }) => text.startsWith("claim Order"));
    expect(claim?.remark).toMatch(/another question: what the names in the statement stand for has changed/);
  });

  it("a definition of the same text that has another meaning is found out", () => {
    const failures = failuresIn(
      recheckAfter(({ cells }) => {
        cells[7]!.source = "define Pair := points 2 where R is { (2,1) }\nclaim Pair ⊨ ∃x ∃y Rxy";
        const shown = cells[7]!.outputs[0]!.metadata.twoplace;
        shown.text = "define Pair := points 2 where R is { (2,1) }";
      }),
    );
    expect(failures.map(({ cell, text }) => [cell, text.slice(0, 11)])).toEqual([
      [8, "define Pair"],
      [8, "claim Pair "],
    ]);
  });

  it("a cell that cannot be read any more", () => {
    const [failure] = failuresIn(
      recheckAfter(({ cells }) => void Object.assign(cells[7]!, { source: "define Pair :=" })),
    );
    expect(failure).toMatchObject({ cell: 8, text: "the cell cannot be read" });
  });
});

describe("edited outputs", () => {
  it("a verdict, where the evidence is for another", () => {
    const [failure, ...rest] = failuresIn(
      recheckAfter((notebook) => void Object.assign(resultOf(notebook, 3, 1), { verdict: "holds" })),
    );
    expect(rest).toEqual([]);
    expect(failure).toMatchObject({ cell: 3, verdict: "holds" });
    expect(failure!.remark).toBe("the stored verdict is `holds`, and the evidence is for `fails`");
  });

  it("a verdict and the evidence's verdict", () => {
    const [failure] = failuresIn(
      recheckAfter((notebook) => {
        const result = resultOf(notebook, 3, 1);
        result.verdict = "holds";
        (result.evidence as Record<string, unknown>).verdict = "holds";
      }),
    );
    expect(failure).toMatchObject({ cell: 3 });
    expect(failure!.remark).toMatch(/^the checker rejects the evidence: /);
  });

  it("an open verdict made a settled one, and a settled one without its evidence", () => {
    const failures = failuresIn(
      recheckAfter((notebook) => {
        resultOf(notebook, 7, 0).verdict = "holds";
        resultOf(notebook, 3, 0).evidence = null;
      }),
    );
    expect(failures.map(({ cell, remark }) => [cell, remark])).toEqual([
      [3, "the verdict `holds` is stored without evidence"],
      [7, "the verdict `holds` is stored without evidence"],
    ]);
  });

  it.each([
    ["compare", 0, (data: Record<string, never[]>) => changeAt(data.pairs, [0, "verdict"])],
    ["compare, jointly inconsistent", 0, (data: Record<string, never[]>) => changeAt(data.pairs, [0, "jointlyInconsistent"])],
    ["compare, inconsistent", 0, (data: Record<string, unknown>) => void Object.assign(data, { inconsistent: ["Order"] })],
    ["independence", 1, (data: Record<string, never>) => changeAt(data.axioms, ["irr"])],
    ["minimise", 2, (data: Record<string, unknown>) => void Object.assign(data, { sets: [["irr"]] })],
    ["dualise", 3, (data: Record<string, never[]>) => changeAt(data.pairs, [5, "verdict"])],
  ])("the data of %s", (_, output, change) => {
    const failures = failuresIn(
      recheckAfter((notebook) => void change(resultOf(notebook, 4, output).data as never)),
    );
    expect(failures).toMatchObject([{ cell: 4, outcome: "does not hold" }]);
  }); // biome-ignore format: a row each

  it("sizes, models and properties that the evidence does not have", () => {
    const failures = failuresIn(
      recheckAfter((notebook) => {
        (resultOf(notebook, 3, 1).data as Record<string, unknown>).countermodelSize = 7;
        (resultOf(notebook, 5, 0).data as Record<string, unknown>).provenUpTo = 3;
        (resultOf(notebook, 5, 1).data as { models: { R: unknown }[] }).models[0]!.R = [[1, 1]];
        Object.assign((resultOf(notebook, 9, 0).data as { axioms: object }).axioms, { trans: "redundant" });
        Object.assign(resultOf(notebook, 9, 1).data as object, { used: ["irr"] });
        const { properties } = resultOf(notebook, 6, 0).data as {
          properties: { property: string; status: string }[];
        };
        properties.find(({ property }) => property === "dense(R)")!.status = "follows";
      }),
    );
    expect(failures.map(({ cell, text }) => `${cell} ${text.split(" ")[0]}`)).toEqual([
      "3 conjecture",
      "5 check-finite",
      "5 models",
      "6 describe",
      "9 conjecture",
      "9 claim",
    ]);
  });

  it("infinite structures and reasons that the evidence does not have", () => {
    const changes: readonly ((data: Record<string, never>) => void)[] = [
      (data) => void Object.assign(data, { infiniteModel: "dense-line where R(x,y) iff y < x" }),
      (data) => void Object.assign(data, { infiniteModel: 3 }),
      (data) => void Object.assign(data, { modelSize: 3 }),
      (data) => changeAt(data, ["reason", "relation"]),
      (data) => void Object.assign(data, { reason: null }),
    ];
    for (const [index, change] of changes.entries()) {
      const output = index % 2;
      const failures = failuresIn(
        recheckAfter((notebook) => void change(resultOf(notebook, 10, output).data as never), 10, 10),
      );
      expect(failures, String(index)).toMatchObject([{ cell: 10, outcome: "does not hold" }]);
    }
    const [failure] = failuresIn(
      recheckAfter(
        (notebook) => void Object.assign(resultOf(notebook, 10, 2).data as object, { infiniteModel: "Q" }),
        10,
        10,
      ),
    );
    expect(failure!.remark).toBe("the infinite structure that is stored is none of those in the evidence");
    // A front end may write keys in another order.
    const turned = recheckAfter(
      (notebook) => {
        const data = resultOf(notebook, 10, 0).data as { reason: Record<string, unknown> };
        data.reason = Object.fromEntries(Object.entries(data.reason).reverse());
      },
      10,
      10,
    );
    expect(failuresIn(turned)).toEqual([]);
  });

  it("what a reader sees, while the stored result is as it was", () => {
    for (const type of ["text/plain", "text/html"]) {
      const [failure] = failuresIn(
        recheckAfter(({ cells }) => {
          const { data } = cells[2]!.outputs[1]!;
          data[type] = [data[type]!].flat().join("").replace("fails", "holds");
        }),
      );
      expect(failure).toMatchObject({ cell: 3 });
      expect(failure!.remark).toBe(`the output shows something else than the stored result (${type})`);
    }
  });

  it("a removed output, and outputs of two cells that have changed places", () => {
    const [removed, ...rest] = failuresIn(recheckAfter(({ cells }) => void cells[2]!.outputs.shift()));
    expect(rest).toEqual([]);
    expect(removed).toMatchObject({ cell: 3, outcome: "missing" });
    const swapped = failuresIn(
      recheckAfter(({ cells }) => {
        [cells[2]!.outputs, cells[7]!.outputs] = [cells[7]!.outputs, cells[2]!.outputs];
      }),
    );
    expect(swapped.map(({ cell, outcome }) => [cell, outcome])).toEqual([
      [3, "missing"],
      [3, "missing"],
      [3, "does not hold"],
      [3, "does not hold"],
      [8, "missing"],
      [8, "does not hold"],
      [8, "does not hold"],
    ]);
  });

  it("every part of the evidence of a derivation, changed by itself", () => {
    const { evidence } = resultOf(JSON.parse(ran) as Cells, 3, 0);
    const leaves = leavesOf(evidence);
    expect(leaves.length).toBeGreaterThan(60);
    for (const path of leaves) {
      const failures = failuresIn(
        recheckAfter((notebook) => changeAt(resultOf(notebook, 3, 0).evidence, path), 3, 3),
      );
      expect(
        failures.map(({ cell }) => cell),
        path.join("."),
      ).toEqual([3]);
    }
  });
});

describe("damage", () => {
  it.each([
    ["no object", () => "holds"],
    ["a foreign key", (result: object) => ({ ...result, more: 1 })],
    ["a missing key", ({ verdict, ...result }: Record<string, unknown>) => result],
    ["steps that are no number", (result: object) => ({ ...result, steps: "12" })],
  ])("metadata with %s", (_, change) => {
    const failures = failuresIn(
      recheckAfter(({ cells }) => {
        const { metadata } = cells[2]!.outputs[0]!;
        metadata.twoplace = change(metadata.twoplace) as never;
      }),
    );
    expect(failures).toMatchObject([
      { cell: 3, text: "output 1" },
      { cell: 3, outcome: "missing" },
    ]);
    expect(failures[0]!.remark).toMatch(/^its metadata are damaged: /);
  });

  it.each([
    ["of another version", (evidence: object) => ({ ...evidence, version: 2 }), /version 2/],
    ["with a foreign key", (evidence: object) => ({ ...evidence, more: 1 }), /foreign key/],
    ["without facts", (evidence: object) => ({ ...evidence, facts: [] }), /checker rejects/],
    ["of something else", () => ({ format: "other" }), /checker rejects/],
    ["compressed and cut off", (evidence: object) => ({ deflate: deflateSync(JSON.stringify(evidence)).toString("base64").slice(0, 80) }), /damaged/],
    ["compressed by nobody", () => ({ deflate: "AAAA" }), /damaged/],
    ["compressed, of no JSON", () => ({ deflate: deflateSync("{").toString("base64") }), /damaged/],
  ])("evidence %s", (_, change, message) => {
    const failures = failuresIn(
      recheckAfter((notebook) => {
        const result = resultOf(notebook, 3, 0);
        result.evidence = change(result.evidence as object);
      }),
    );
    expect(failures).toMatchObject([{ cell: 3, outcome: "does not hold" }]);
    expect(failures[0]!.remark).toMatch(message);
  }); // biome-ignore format: a row each

  it("data of any other form is a finding, never a crash", () => {
    for (const cell of [3, 4, 5, 6, 7, 8, 9, 10])
      for (const [place] of (JSON.parse(ran) as Cells).cells[cell - 1]!.outputs.entries())
        for (const strange of [null, 7, "x", [], [null], { x: null }])
          recheckAfter(
            (notebook) => {
              const { data } = resultOf(notebook, cell, place) as { data: Record<string, unknown> };
              for (const key of Object.keys(data)) data[key] = strange;
            },
            cell,
            cell,
          );
  });
});

describe("the command", () => {
  it("ends with 1 and says how many results could not be confirmed", () => {
    const notebook = JSON.parse(ran) as Cells;
    resultOf(notebook, 3, 0).verdict = "fails";
    write("edited.ipynb", notebook);
    const { status, stdout, stderr } = twoplace("recheck", "edited.ipynb");
    expect(status).toBe(1);
    expect(stdout).toMatch(/^cell 3 {3}claim Order ⊨ .* fails +does not hold: the stored verdict is `fails`/);
    expect(stdout).toMatch(/\n17 results: 14 accepted, 1 open, 1 computed, 1 does not hold; /);
    expect(stderr).toBe("twoplace: edited.ipynb: 1 result could not be confirmed\n");
  });

  it.each([
    ["that is not JSON", "{", /cannot recheck .*: not a notebook: the file is not JSON/],
    ["that is a list", "[]", /not a notebook/],
    ["of format 3", '{"nbformat": 3, "worksheets": []}', /old format nbformat 3/],
    [
      "for another kernel",
      '{"nbformat": 4, "nbformat_minor": 5, "metadata": {"kernelspec": {"name": "ir"}}, "cells": []}',
      /kernel ir/,
    ],
  ])("refuses a file %s with 2 and a reason", (_, text, message) => {
    const { status, stdout, stderr } = twoplace("recheck", write("refused.ipynb", text));
    expect({ status, stdout }).toEqual({ status: 2, stdout: "" });
    expect(stderr).toMatch(message);
  });

  it("refuses a file that is not there and a call without one with 2, and explains itself", () => {
    expect(twoplace("recheck", "nowhere.ipynb")).toMatchObject({ status: 2, stdout: "" });
    expect(twoplace("recheck").status).toBe(2);
    const help = twoplace("recheck", "--help");
    expect(help.status).toBe(0);
    expect(help.stdout).toContain("without searching");
  });
});
