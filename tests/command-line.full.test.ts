/** The commands as a user runs them: what goes to which stream, and the exit status. */
import { spawn, spawnSync } from "node:child_process";
import { mkdtempSync, readFileSync, rmSync, writeFileSync } from "node:fs";
import { tmpdir } from "node:os";
import { join, resolve } from "node:path";
import { afterAll, beforeAll, describe, expect, it } from "vitest";
import { checkEvidence } from "../lib/evidence/check.ts";

const root = resolve(import.meta.dirname, "..");
const launcher = join(root, "kernel", "launch.mjs");
let folder: string;

beforeAll(() => {
  folder = mkdtempSync(join(tmpdir(), "twoplace-"));
});
afterAll(() => rmSync(folder, { recursive: true }));

function twoplace(args: readonly string[], input = "") {
  const { status, stdout, stderr } = spawnSync(process.execPath, [launcher, ...args], {
    cwd: folder,
    input,
    encoding: "utf8",
  });
  return { status, stdout, stderr };
}

function write(name: string, text: string | Buffer): string {
  const file = join(folder, name);
  writeFileSync(file, text);
  return file;
}

const cells = (...sources: string[]) => ({
  nbformat: 4,
  nbformat_minor: 5,
  metadata: { kernelspec: { name: "twoplace", display_name: "Twoplace", language: "twoplace" } },
  cells: sources.map((source, index) => ({
    cell_type: "code",
    id: `cell-${index}`,
    metadata: {},
    source,
    outputs: [],
    execution_count: null,
  })),
});

describe("eval", () => {
  it("prints results for people, from a file and from standard input", () => {
    const text = "claim { ∀x ¬Rxx } ⊭ ∀x ∀y (Rxy → Ryx)\n";
    const fromFile = twoplace(["eval", write("one.txt", text)]);
    const fromInput = twoplace(["eval", "-"], text);
    expect(fromFile).toMatchObject({ status: 0, stderr: "" });
    expect(fromFile.stdout).toMatch(/^holds: a countermodel on 2 points/);
    expect(fromInput).toEqual(fromFile);
  });

  it("prints one array with the documented keys, evidence that the checker accepts among them", () => {
    const { status, stdout } = twoplace(
      ["eval", "--json"],
      "define T := { ∀x ∃y Rxy }\ncheck-finite T\ncompare T, {}",
    );
    expect(status).toBe(0);
    const results = JSON.parse(stdout) as Record<string, unknown>[];
    expect(results.map((result) => result.statement)).toEqual(["define", "check-finite", "compare"]);
    expect(results[1]).toMatchObject({
      text: "check-finite T",
      verdict: "finite",
      data: { leastSize: 1, modelSize: 1, noModelUpTo: 0 },
      diagnostics: [],
    });
    expect(results[2]!.data).toMatchObject({
      pairs: [{ left: "T", right: "{}", verdict: "stronger", jointlyInconsistent: false }],
      classes: [["T"], ["{}"]],
      inconsistent: [],
    });
    for (const { evidence } of results.slice(1))
      expect(checkEvidence(evidence)).toMatchObject({ accepted: true });
  });

  it("ends with 1 when a claim is not established, and says which on standard error", () => {
    const { status, stdout, stderr } = twoplace(["eval"], "claim { ∀x Rxx } ⊨ ∀x ∀y Rxy");
    expect(status).toBe(1);
    expect(stdout).toMatch(/^fails: a countermodel on 2 points/);
    expect(stderr).toMatch(/a claim is not established/);
  });

  it("ends with 1 on mistakes, which it lists with places in code points", () => {
    const { status, stdout, stderr } = twoplace(["eval", "--json"], "claim 𝔸 ⊨ ∀x Rxyx");
    expect(status).toBe(1);
    expect(stderr).toMatch(/\^/);
    const [result] = JSON.parse(stdout) as { diagnostics: { from: number; to: number; code: string }[] }[];
    const places = result!.diagnostics.map(({ from, to }) => [from, to]);
    expect(places).toContainEqual([6, 7]);
  });

  it.each([
    ["a missing file", ["eval", "none.txt"], /no such file/],
    ["a folder", ["eval", "."], /is a folder/],
    ["an unknown option", ["eval", "--loud"], /unknown option/],
    ["an unknown command", ["prove"], /unknown command/],
    ["a port that is none", ["serve", "--port", "70000"], /whole number from 0 to 65535/],
  ])("ends with 2 on %s", (_, args, message) => {
    const { status, stdout, stderr } = twoplace(args);
    expect({ status, stdout }).toEqual({ status: 2, stdout: "" });
    expect(stderr).toMatch(message);
  });

  it("ends with 2 on text that is not UTF-8", () => {
    const { status, stderr } = twoplace(["eval", write("bad.txt", Buffer.from([0xff, 0xfe, 0x41]))]);
    expect(status).toBe(2);
    expect(stderr).toMatch(/not UTF-8/);
  });

  it("stops at an interrupt and keeps what was answered", async () => {
    const hard = "{ ∀x ¬Rxx; ∀x ∀y (x ≠ y → Rxy ∨ Ryx); ∀x ∀y (Rxy → ¬Ryx); ∀x ∀y ∀z ∃w (Rwx ∧ Rwy ∧ Rwz) }";
    const file = write(
      "long.txt",
      `claim { ∀x Rxx } is consistent\ncheck-finite ${hard} up to 18 within 100000000 steps`,
    );
    const child = spawn(process.execPath, [launcher, "eval", file]);
    let stdout = "";
    let stderr = "";
    child.stderr.on("data", (part) => {
      stderr += part;
    });
    const status = await new Promise((done) => {
      child.stdout.on("data", (part) => {
        const begun = stdout.includes("checked");
        stdout += part;
        // Once: a second interrupt ends the process at once.
        if (!begun && stdout.includes("checked")) child.kill("SIGINT");
      });
      child.on("exit", done);
    });
    expect(status).toBe(1);
    expect(stdout).toMatch(/^holds: a model on 1 point/);
    expect(stderr).toMatch(/^Interrupted: stopped at: check-finite/);
    expect(stderr).toMatch(/1 of 2 statements had been answered/);
  });
});

describe("run", () => {
  it("executes a notebook into another file, prints its claims, and leaves the first as it was", () => {
    const text = JSON.stringify(cells("define T := { a: ∀x Rxx }", "claim T is consistent\ncheck-finite T"));
    const file = write("in.ipynb", text);
    const { status, stdout, stderr } = twoplace(["run", file, "--output", "out.ipynb"]);
    expect({ status, stderr }).toEqual({ status: 0, stderr: "" });
    expect(stdout).toContain("cell 2: claim T is consistent\n    holds: a model on 1 point");
    expect(readFileSync(file, "utf8")).toBe(text);
    const executed = JSON.parse(readFileSync(join(folder, "out.ipynb"), "utf8"));
    expect(
      executed.cells[1].outputs.map(
        (output: { metadata: { twoplace: { verdict: string } } }) => output.metadata.twoplace.verdict,
      ),
    ).toEqual(["holds", "finite"]);
  });

  it("gives the same bytes each time, and takes the place of its input without --output", () => {
    const file = write(
      "same.ipynb",
      JSON.stringify(cells("models { ∀x ∃y Rxy } of size 3", "dualise { ∀x ∃y Rxy }")),
    );
    expect(twoplace(["run", file]).status).toBe(0);
    const first = readFileSync(file);
    expect(twoplace(["run", file]).status).toBe(0);
    expect(readFileSync(file).equals(first)).toBe(true);
  });

  it("runs the rest when a cell fails, and ends with 1", () => {
    const file = write(
      "fails.ipynb",
      JSON.stringify(cells("claim { ∀x Rxx } ⊨ ∀x ∀y Rxy", "check-finite {}")),
    );
    const { status, stdout, stderr } = twoplace(["run", file]);
    expect(status).toBe(1);
    expect(stdout).toContain("cell 2: check-finite {}");
    expect(stderr).toMatch(/^cell 1: FailedClaims/m);
  });

  it.each([
    ["that is not JSON", "{", /not JSON/i],
    ["of format 3", '{"nbformat": 3, "worksheets": []}', /format 3|nbformat 3/],
    ["that is a list", "[]", /.+/],
    [
      "for another kernel",
      JSON.stringify({ ...cells(), metadata: { kernelspec: { name: "ir", display_name: "R" } } }),
      /kernel ir/,
    ],
  ])("refuses a notebook %s with 2 and a reason, and does not touch it", (_, text, message) => {
    const file = write("refused.ipynb", text);
    const { status, stdout, stderr } = twoplace(["run", file]);
    expect({ status, stdout }).toEqual({ status: 2, stdout: "" });
    expect(stderr).toMatch(message);
    expect(readFileSync(file, "utf8")).toBe(text);
  });
});

describe("serve", () => {
  it("prints an address with a token on this machine, which answers, and ends when asked to", async () => {
    const child = spawn(process.execPath, [launcher, "serve", "--port", "0"], { cwd: folder });
    const address = await new Promise<string>((found) =>
      child.stdout.once("data", (part) => found(String(part).trim())),
    );
    const url = new URL(address);
    expect(url.hostname).toBe("127.0.0.1");
    expect(url.searchParams.get("token")).toMatch(/^[0-9a-f]{64}$/);
    const specs = await fetch(new URL(`/api/kernelspecs${url.search}`, url));
    expect(await specs.json()).toMatchObject({ default: "twoplace" });
    expect((await fetch(new URL("/api/kernels", url))).status).toBe(401);
    const ended = new Promise((done) => child.once("exit", done));
    child.kill("SIGTERM");
    expect(await ended).toBe(0);
  });
});

describe("npx twoplace", () => {
  it("works in a clone", () => {
    const { status, stdout } = spawnSync("npx", ["twoplace", "--version"], { cwd: root, encoding: "utf8" });
    expect({ status, stdout: stdout.trim() }).toEqual({ status: 0, stdout: "0.1.0" });
  });
});
