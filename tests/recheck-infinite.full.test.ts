/**
 * `twoplace recheck` on cells with infinite structures, free terms and reasons why there is no finite model: a notebook that
 * was run holds; what is changed in its verdicts, structures, sizes, reasons and definitions is found, with its place.
 */
import { spawnSync } from "node:child_process";
import { mkdtempSync, readFileSync, rmSync, writeFileSync } from "node:fs";
import { tmpdir } from "node:os";
import { join, resolve } from "node:path";
import { afterAll, beforeAll, describe, expect, it } from "vitest";
import { type Finding, recheckNotebook } from "../kernel/commands/recheck-notebook.ts";
import { prepareDrawing } from "../kernel/display/drawing.ts";
import { readNotebook } from "../kernel/notebook/read.ts";
import { checkEvidence } from "../lib/evidence/check.ts";
import { digestOf } from "../lib/evidence/digest.ts";
import type { Evidence, Fact, FormulaRecord, PrincipleRecord } from "../lib/evidence/format.ts";
import { askEntails } from "../lib/inquiry/claims.ts";
import { formulaOf } from "../lib/inquiry/finiteness/reason.ts";
import { unwatchedWork } from "../lib/inquiry/work.ts";
import { obligationsOf } from "../lib/logic/records/finiteness.ts";
import { readTheory } from "./support/corpora.ts";
import { changeAt, leavesOf } from "./support/leaves.ts";

const launcher = join(resolve(import.meta.dirname, ".."), "kernel", "launch.mjs");
let folder: string;

/** Cell by cell; findings number them from 1. */
const SOURCES = [
  "define Order := { irr: ∀x ¬Rxx; trans: ∀x ∀y ∀z (Rxy ∧ Ryz → Rxz); up: ∀x ∃y Rxy }",
  "check-finite Order\nclaim Order is infinite-only\nclaim Order has no finite model",
  "define Q := dense-line where Rxy iff x < y\ndefine N := half-line where Rxy iff y = x + 1",
  "claim Q ⊨ ∀x ∀y (Rxy → ∃z (Rxz ∧ Rzy))\nclaim N ⊭ ∀x ∃y Ryx",
  "conjecture Order ⊨ ∀x ∀y (Rxy ∨ Ryx ∨ x = y)\nclaim Order ⊭ ∀x ∃y Ryx",
  "define Adjoin := { empty: ∃x ∀y ¬Ryx; adj: ∀x ∀y ∃z ∀w (Rwz ↔ Rwx ∨ w = y) }",
  "check-finite Adjoin\nclaim Adjoin is consistent",
  "compare Order, Order + { dense: ∀x ∀y (Rxy → ∃z (Rxz ∧ Rzy)) }\nindependence Order + { dense: ∀x ∀y (Rxy → ∃z (Rxz ∧ Rzy)) }\nminimise Order + { asym: ∀x ∀y (Rxy → ¬Ryx) }\ndualise Order",
  "describe Q\ndescribe Order",
  "claim Order is weaker than Order + { dense: ∀x ∀y (Rxy → ∃z (Rxz ∧ Rzy)) }",
];

interface Output {
  data: Record<string, string | string[]>;
  metadata: { twoplace: Result };
}
interface Result {
  text: string;
  verdict: string | null;
  summary: string;
  data: Record<string, unknown>;
  evidence: Evidence;
}
interface Cells {
  cells: { source: string; outputs: Output[] }[];
}
let ran: string;

beforeAll(async () => {
  folder = mkdtempSync(join(tmpdir(), "twoplace-"));
  await prepareDrawing();
  const cells = SOURCES.map((source, index) => ({
    ...{ cell_type: "code", id: `cell-${index}`, metadata: {}, source, outputs: [], execution_count: null },
  }));
  const draft = join(folder, "draft.ipynb");
  writeFileSync(draft, JSON.stringify({ nbformat: 4, nbformat_minor: 5, metadata: {}, cells }));
  const { status } = twoplace("run", "draft.ipynb", "--output", "ran.ipynb");
  expect(status).toBe(0);
  ran = readFileSync(join(folder, "ran.ipynb"), "utf8");
});
afterAll(() => rmSync(folder, { recursive: true }));

function twoplace(...args: readonly string[]) {
  return spawnSync(process.execPath, [launcher, ...args], { cwd: folder, encoding: "utf8" });
}

/** What rechecking some cells, besides those that define, comes to after a change. */
function recheckAfter(
  change: (notebook: Cells) => void,
  kept: readonly number[] = SOURCES.map((_, index) => index + 1),
): readonly Finding[] {
  const notebook = JSON.parse(ran) as Cells;
  for (const [index, cell] of notebook.cells.entries())
    if (!kept.includes(index + 1) && !SOURCES[index]!.startsWith("define"))
      Object.assign(cell, { source: "", outputs: [] });
  change(notebook);
  const read = readNotebook(JSON.stringify(notebook));
  if ("problem" in read) throw new Error(read.problem);
  return recheckNotebook(read.notebook);
}

function resultOf(notebook: Cells, cell: number, output: number): Result {
  return notebook.cells[cell - 1]!.outputs[output]!.metadata.twoplace;
}

function failuresIn(findings: readonly Finding[]): readonly Finding[] {
  return findings.filter(({ outcome }) => outcome === "does not hold" || outcome === "missing");
}

/** The same after a change of one result; it must be found there and nowhere else. */
function expectFound(cell: number, output: number, change: (result: Result) => void, remark: RegExp): void {
  const failures = failuresIn(recheckAfter((notebook) => change(resultOf(notebook, cell, output)), [cell]));
  expect(failures).toMatchObject([{ cell, outcome: "does not hold" }]);
  expect(failures[0]!.text).toBe(resultOf(JSON.parse(ran) as Cells, cell, output).text);
  expect(failures[0]!.remark).toMatch(remark);
}

/** The first fact of a kind, to be changed. */
function factIn(result: Result, kind: Fact["fact"]): Record<string, unknown> {
  return result.evidence.facts.find(({ fact }) => fact === kind) as unknown as Record<string, unknown>;
}

describe("a notebook with infinite structures and reasons", () => {
  it("holds as it was run", () => {
    const { status, stdout } = twoplace("recheck", "ran.ipynb");
    expect(status).toBe(0);
    expect(stdout).toMatch(/^cell 2 +check-finite Order +infinite-only +accepted$/m);
    expect(stdout).toMatch(/^cell 4 +claim N ⊭ ∀x ∃y Ryx +holds +accepted$/m);
    expect(stdout.trimEnd().split("\n").at(-1)).toBe(
      "15 results: 15 accepted; 5 definitions and forms read again",
    );
  });

  it("has evidence of all kinds", () => {
    const { cells } = JSON.parse(ran) as Cells;
    const facts = cells.flatMap(({ outputs }) =>
      outputs.flatMap(({ metadata }) => metadata.twoplace?.evidence?.facts ?? []),
    );
    expect(new Set(facts.map(({ fact }) => fact))).toEqual(
      new Set(["structure", "terms", "derivation", "no-finite-model"]),
    );
  });
});

describe("an edited definition", () => {
  it.each([
    ["Q := dense-line where Rxy iff x < y", "Q := dense-line where Rxy iff x > y", [3, 4, 9]],
    ["Q := dense-line where Rxy iff x < y", "Q := integer-line where Rxy iff x < y", [3, 4, 9]],
    ["y = x + 1", "y = x + 2", [3, 4]],
    ["y = x + 1", "y <= x + 1", [3, 4]],
    ["up: ∀x ∃y Rxy }", "up: ∀x ∃y Ryx }", [1, 2, 5, 8, 9, 10]],
    ["empty: ∃x ∀y ¬Ryx", "empty: ∃x ∀y ¬Rxy", [6, 7]],
  ])("%s → %s is found in every cell that uses it", (from, to, places) => {
    const failures = failuresIn(
      recheckAfter(({ cells }) => {
        const cell = cells.find(({ source }) => [source].flat().join("").includes(from))!;
        cell.source = [cell.source].flat().join("").replace(from, to);
      }),
    );
    expect([...new Set(failures.map(({ cell }) => cell))]).toEqual(places);
    for (const { cell, remark } of failures)
      expect(remark, `${cell}`).toMatch(
        /no result is stored|edited since it was run|has changed since it was run/,
      );
  });

  it("of another structure that reads the same is none", () => {
    // As a text of another cell that says the same in other words: only the definition's own output must be made again.
    const failures = failuresIn(
      recheckAfter(
        ({ cells }) => {
          const cell = cells[2]!;
          cell.source = [cell.source].flat().join("").replace("x < y", "¬ y ≤ x");
        },
        [3, 4],
      ),
    );
    expect(failures.map(({ cell }) => cell)).toEqual([3]);
  });
});

describe("changed results", () => {
  it.each([
    [2, 0, "consistent"],
    [2, 0, "no-finite-model"],
    [2, 0, "finite"],
    [2, 0, "inconsistent"],
    [2, 1, "fails"],
    [4, 0, "fails"],
    [5, 0, "holds"],
    [7, 0, "no-finite-model"],
    [7, 1, "fails"],
    [10, 0, "fails"],
  ])("cell %i, output %i: the verdict %s, alone or in the evidence too", (cell, output, verdict) => {
    expectFound(cell, output, (result) => void Object.assign(result, { verdict }), /^the stored verdict is/);
    expectFound(
      cell,
      output,
      (result) => {
        result.summary = result.summary.replace(/^[^:]*/, verdict);
        Object.assign(result, { verdict, evidence: { ...result.evidence, verdict } });
      },
      // Some of them are true as well; then the output shows another.
      /^the checker rejects the evidence|the output shows something else/,
    );
  });

  it.each<[string, number, number, string, unknown, RegExp]>([
    ["a size of an infinite structure", 2, 0, "modelSize", 3, /none of that size|none up to/],
    ["a size of a countermodel", 5, 0, "countermodelSize", 9, /9 points is stored, and the evidence has none/],
    ["a least size", 2, 0, "leastSize", 4, /4 is said to be the least size/],
    ["a proof for a size", 2, 0, "provenUpTo", 1, /no proof is there/],
    ["another infinite structure", 2, 0, "infiniteModel", "dense-line where R(x,y) iff x > y", /infinite structure that is stored/],
    ["no infinite structure", 2, 0, "infiniteModel", undefined, /infinite structure that is stored/],
    ["other free terms", 7, 0, "infiniteModel", "the free terms of c and g(x)", /infinite structure that is stored/],
    ["another reason", 2, 0, "reason.relation", "R(y,x)", /the stored reason/],
    ["a reason with a parameter", 2, 1, "reason.parameters", ["p"], /the stored reason/],
    ["no reason", 2, 2, "reason", undefined, /the stored reason/],
    ["another claim", 2, 1, "claim", "consistent", /the stored data are about/],
    ["an axiom that is used", 7, 0, "used", ["irr"], /`irr` is said to be used/],
    ["a word of independence", 8, 1, "axioms.dense", "redundant", /`redundant`/],
    ["a joint model", 8, 0, "pairs.0.jointlyInconsistent", true, /jointly inconsistent/],
    ["the definition of a structure", 9, 0, "definition", "dense-line where R(x,y) iff y < x", /reads otherwise now/],
    ["the size of a structure", 9, 0, "size", 7, /reads otherwise now/],
  ])("%s", (_, cell, output, path, value, remark) => {
    expectFound(cell, output, ({ data }) => set(data, path, value), remark);
  }); // biome-ignore format: a row each

  it.each<[string, number, number, Fact["fact"], string, unknown]>([
    ["other kinds", 2, 0, "structure", "structure.tables.R.holds", [0, 2]],
    ["no kinds", 2, 0, "structure", "structure.tables.R.holds", []],
    ["another carrier", 2, 0, "structure", "structure.carrier", { kind: "points", size: 2 }],
    ["another principle", 2, 0, "no-finite-model", "principle.relation", ["is", "R", "y", "x"]],
    ["other axioms", 2, 0, "no-finite-model", "axioms", [0, 1]],
    ["a certificate", 7, 0, "terms", "certificates.0", []],
    ["the place of the recursion", 7, 0, "terms", "terms.relations.R.on", 0],
    ["the recursion", 7, 0, "terms", "terms.relations.R.cases", {}],
  ])("%s in the evidence", (_, cell, output, kind, path, value) => {
    expectFound(cell, output, (result) => set(factIn(result, kind), path, value), /^the checker rejects the evidence/);
  }); // biome-ignore format: a row each

  it("every part of the evidence of a reason and of a claim about a structure, changed by itself", () => {
    for (const [cell, output] of [[2, 0], [4, 0]] as const) {
      const { evidence } = resultOf(JSON.parse(ran) as Cells, cell, output);
      // Whether conditions are asked for everywhere is the same where all elements are looked at.
      const paths = leavesOf(evidence).filter((path) => path.at(-1) !== "everywhere");
      expect(paths.length).toBeGreaterThan(20);
      for (const path of paths) {
        const failures = failuresIn(
          recheckAfter((notebook) => changeAt(resultOf(notebook, cell, output).evidence, path), [cell]),
        );
        expect(failures.map((failure) => failure.cell), path.join(".")).toEqual([cell]);
      }
    }
  }); // biome-ignore format: short lines

  it("the statuses of properties that describe finds", () => {
    /** With an infinite model and one without. */
    const isInfinite = (status: unknown, search: unknown) =>
      status === "neither" && (search as { readonly infinite?: boolean }).infinite === true;
    const findings = (change: (property: Record<string, unknown>) => void) =>
      failuresIn(
        recheckAfter(
          (notebook) => {
            const { properties } = resultOf(notebook, 9, 1).data as { properties: Record<string, unknown>[] };
            change(properties.find(({ status, modelWith }) => isInfinite(status, modelWith))!);
          },
          [9],
        ),
      );
    expect(findings(() => undefined)).toEqual([]);
    for (const change of [{ status: "follows" }, { status: "open" }, { modelWith: null }])
      expect(findings((property) => void Object.assign(property, change))).toMatchObject([{ cell: 9 }]);
    const search = (side: string, change: object) =>
      findings((property) => void Object.assign(property[side] as object, change));
    expect(search("modelWith", { size: 2 })).toMatchObject([{ cell: 9 }]);
    expect(search("modelWithout", { size: 2 })).toMatchObject([{ cell: 9 }]);
  });
});

/** Puts a value at a place, or takes away what is there. */
function set(value: object, path: string, part: unknown): void {
  const keys = path.split(".");
  const last = keys.pop()!;
  const holder = keys.reduce<unknown>((inner, key) => (inner as Record<string, unknown>)[key], value);
  if (part === undefined) delete (holder as Record<string, unknown>)[last];
  else (holder as Record<string, unknown>)[last] = part;
}

describe("strange evidence that the checker accepts", () => {
  it("with a reason about a relation of its own is a finding, not a crash", () => {
    const texts = [
      "forall x. ~R(x,x)",
      "forall x y z. R(x,y) & R(y,z) -> R(x,z)",
      "forall x. exists y. R(x,y)",
    ];
    const theory = readTheory(texts);
    const foreign: FormulaRecord = ["or", ["is", "S", "x"], ["not", ["is", "S", "x"]]];
    const failures = failuresIn(
      recheckAfter(
        (notebook) => {
          const result = resultOf(notebook, 2, 0);
          const { evidence } = result;
          const reason = evidence.facts.find((fact) => fact.fact === "no-finite-model")!;
          const principle = { ...reason.principle, domain: foreign } as PrincipleRecord;
          const sentences = [...evidence.sentences];
          const number = (sentence: FormulaRecord) => {
            const known = sentences.findIndex((one) => JSON.stringify(one) === JSON.stringify(sentence));
            return known >= 0 ? known : sentences.push(sentence) - 1;
          };
          const symbols = new Map([
            ["R", { name: "R", places: 2, infix: false }],
            ["S", { name: "S", places: 1, infix: false }],
          ]);
          const derivations = obligationsOf(principle)!.flatMap((obligation): readonly Fact[] => {
            const shown = askEntails(theory, formulaOf(obligation, symbols), unwatchedWork).evidence!;
            return shown.facts.map((fact) => {
              if (fact.fact !== "derivation") throw new Error("a derivation is expected");
              const premises = fact.premises.map((premise) => number(shown.sentences[premise]!));
              return { ...fact, premises, conclusion: number(obligation) };
            });
          });
          const facts = evidence.facts.map((fact) => (fact === reason ? { ...reason, principle } : fact));
          result.evidence = { ...evidence, sentences, facts: [...facts, ...derivations] };
          expect(result.evidence.digest).toBe(digestOf(sentences, evidence.question));
          expect(checkEvidence(result.evidence)).toMatchObject({ accepted: true });
        },
        [2],
      ),
    );
    expect(failures).toMatchObject([{ cell: 2, outcome: "does not hold" }]);
    expect(failures[0]!.remark).toMatch(/the stored reason/);
  });

  it("with a finite structure too large for a table is a finding, not a crash", () => {
    expectFound(
      5,
      0,
      (result) => {
        const tables = { R: { places: 2, holds: [] } };
        const structure = { carrier: { kind: "points", size: 1_000_000 } as const, tables };
        const fact: Fact = { fact: "structure", structure, holds: [], fails: null };
        result.evidence = { ...result.evidence, facts: [...result.evidence.facts, fact] };
        result.data.infiniteModel = "points 1000000";
        expect(checkEvidence(result.evidence)).toMatchObject({ accepted: true });
      },
      /infinite structure that is stored/,
    );
  });

  it("in data of any other form is a finding, never a crash", () => {
    for (const cell of [2, 4, 5, 7, 8, 9, 10])
      for (const [place] of (JSON.parse(ran) as Cells).cells[cell - 1]!.outputs.entries())
        for (const strange of [null, 7, "x", [], [null], { x: null }])
          recheckAfter(
            (notebook) => {
              const { data } = resultOf(notebook, cell, place);
              for (const key of Object.keys(data)) data[key] = strange;
            },
            [cell],
          );
  });
});
