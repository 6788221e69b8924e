/** The evaluator in a worker thread: interrupts, and what is left after the thread has died. */
import { afterEach, beforeEach, describe, expect, test } from "vitest";
import type { CellEvent, CellOutcome } from "../kernel/session/evaluator.ts";
import { ThreadEvaluator, type ThreadOptions } from "../kernel/session/thread.ts";

const entry = new URL("./support/kernel-script-worker.ts", import.meta.url);

let evaluator: ThreadEvaluator;
let events: CellEvent[];

function start(options: ThreadOptions = {}): void {
  evaluator = new ThreadEvaluator({ entry, ...options });
}

beforeEach(() => {
  events = [];
});
afterEach(() => evaluator.close());

const run = (code: string): Promise<CellOutcome> => evaluator.runCell(code, (event) => events.push(event));

/** What `recall` prints: the names that the session knows. */
async function recall(): Promise<string> {
  events = [];
  await run("recall");
  return (events[0] as { text: string }).text;
}

/** Ends when the running cell has shown something, so that it is known to have begun. */
async function begun(): Promise<void> {
  while (events.length === 0) await new Promise((resolve) => setTimeout(resolve, 1));
}

test("runs cells in order and passes on what they show and return", async () => {
  start();
  const outcomes = await Promise.all([run("define Marsh 1\nprint a"), run("fail b"), run("print c")]);
  expect(outcomes.map((outcome) => outcome.status)).toEqual(["ok", "error", "ok"]);
  expect(events.map((event) => (event.kind === "stream" ? event.text : event.data["text/plain"]))).toEqual([
    "Marsh 1",
    "a\n",
    "c\n",
  ]);
  expect(await evaluator.evaluateExpression("Marsh")).toMatchObject({ status: "ok" });
  expect((await evaluator.complete("Ma", 2)).matches).toEqual([{ text: "Marsh", type: "name" }]);
  expect(await evaluator.inspect("Marsh", 1, 1)).toEqual({ "text/plain": "Marsh, detail 1" });
  expect(await evaluator.inspect("Moor", 1, 0)).toBeNull();
  expect(await evaluator.isComplete("{")).toEqual({ status: "incomplete", indent: "  " });
  await evaluator.reset();
  expect(await recall()).toBe("");
});

describe("an interrupt", () => {
  test("stops a cell that keeps its thread busy, and definitions stay", async () => {
    start();
    await run("define Marsh 1");
    events = [];
    const running = run("print begun\nspin");
    await begun();
    evaluator.interrupt();
    expect(await running).toMatchObject({ status: "error", ename: "Interrupted" });
    expect(await recall()).toBe("Marsh");
  });

  test("counts when it comes before the cell has begun, and not for the next cell", async () => {
    start();
    // The worker is still loading: the cell waits, and the interrupt must not be lost.
    const running = run("spin");
    await Promise.resolve();
    evaluator.interrupt();
    expect(await running).toMatchObject({ ename: "Interrupted" });
    evaluator.interrupt();
    expect(await run("print x")).toMatchObject({ status: "ok" });
  });

  test("ends the thread of a cell that does not look at it; definitions are made again", async () => {
    start({ interruptGrace: 50 });
    await run("define Marsh 1\ndefine Moor(x) := 2");
    events = [];
    const running = run("deaf begun");
    await begun();
    evaluator.interrupt();
    const outcome = (await running) as CellOutcome & { evalue: string };
    expect(outcome).toMatchObject({ status: "error", ename: "InternalError" });
    expect(outcome.evalue).toBe(
      "the thread that runs the cells has ended: it did not stop within 50 ms of the interrupt; " +
        "definitions kept: Marsh, Moor",
    );
    expect(await recall()).toBe("Marsh Moor(x)");
  });
});

describe("when the thread dies, the cell says so and definitions are made again", () => {
  test.each([
    ["crash", "it failed with a mistake outside of any call"],
    ["exit", "it exited with status 7"],
    ["hoard", "it was out of memory (its bound is 64 MB)"],
  ])("%s", async (verb, why) => {
    start({ heap: 64 });
    await run("define Marsh 1");
    await run("define Marsh 2\nfail x");
    const outcome = (await run(`define Moor 3\n${verb}`)) as CellOutcome & { evalue: string };
    expect(outcome).toMatchObject({ status: "error", ename: "InternalError" });
    expect(outcome.evalue).toBe(
      `the thread that runs the cells has ended: ${why}; definitions kept: Marsh, Moor`,
    );
    expect(await recall()).toBe("Marsh Marsh Moor");
  });

  test("claims, which are not made again, are counted", async () => {
    start();
    await run("define Marsh 1\nclaim a\nclaim b");
    expect(await run("exit")).toMatchObject({
      evalue: expect.stringMatching(
        /definitions kept: Marsh; claims of earlier cells that are forgotten: 2$/,
      ),
    });
  });

  test("without definitions too, again and again", async () => {
    start();
    for (const _ of [1, 2]) {
      expect(await run("exit")).toMatchObject({
        evalue: expect.stringContaining("there were no earlier definitions to keep"),
      });
    }
    expect(await run("print x")).toMatchObject({ status: "ok" });
  });
});

test("a worker that cannot be loaded is an error of the cell", async () => {
  start({ entry: new URL("./support/no-such-worker.ts", import.meta.url) });
  expect(await run("print x")).toMatchObject({ status: "error", ename: "InternalError" });
});

test("closing ends a running cell with an error", async () => {
  start();
  const running = run("print begun\nspin");
  await begun();
  await evaluator.close();
  expect(await running).toMatchObject({ status: "error", ename: "Interrupted" });
  expect(await run("print x")).toMatchObject({ status: "error" });
});

test("the session itself runs in the kernel's own worker file, stops when asked, and keeps its definitions", async () => {
  evaluator = new ThreadEvaluator();
  const text = "define Fair := { tournament; ∀x ∀y ∀z ∀w ∃v (Rvx ∧ Rvy ∧ Rvz ∧ Rvw) }";
  expect(await run(text)).toMatchObject({ status: "ok" });
  // The least tournament in which any four are beaten by a common one has more than 40 points (Szekeres & Szekeres 1965).
  const running = run("models Fair of size 30 within 1000000000 steps");
  await new Promise((resolve) => setTimeout(resolve, 300));
  evaluator.interrupt();
  expect(await running).toMatchObject({ status: "error", ename: "Interrupted" });
  expect(await evaluator.evaluateExpression("Fair")).toMatchObject({ status: "ok" });
});
