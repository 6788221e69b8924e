/** The way of a cell: from text to results and displays, and what survives when it ends badly. */
import { describe, expect, it } from "vitest";
import type { CellEvent, CellOutcome } from "../kernel/session/evaluator.ts";
import { loadEvidence, storeResult } from "../kernel/session/metadata.ts";
import { Session } from "../kernel/session/session.ts";
import { checkEvidence } from "../lib/evidence/check.ts";

/** A session, and a way to run cells in it that keeps what they show. */
function begin(isInterrupted: () => boolean = () => false, clock: () => number = () => 0) {
  const session = new Session({ isInterrupted, clock });
  const run = async (code: string): Promise<{ outcome: CellOutcome; events: CellEvent[] }> => {
    const events: CellEvent[] = [];
    const outcome = await session.runCell(code, (event) => events.push(event));
    return { outcome, events };
  };
  return { session, run };
}

function resultsOf(outcome: CellOutcome) {
  return outcome.results.map(({ statement, verdict, data }) => ({ statement, verdict, data }));
}

const order = "define Order := { irr: ∀x ¬Rxx; trans: ∀x ∀y ∀z (Rxy ∧ Ryz → Rxz) }";

describe("a cell", () => {
  it("answers its statements in order, each with a display and a result", async () => {
    const { run } = begin();
    const { outcome, events } = await run(
      `${order}\ncheck-finite Order\nclaim Order ⊭ ∀x ∀y (Rxy ∨ Ryx ∨ x = y)`,
    );
    expect(outcome.status).toBe("ok");
    expect(resultsOf(outcome)).toMatchObject([
      { statement: "define", verdict: null },
      { statement: "check-finite", verdict: "finite", data: { leastSize: 1, modelSize: 1, noModelUpTo: 0 } },
      { statement: "claim", verdict: "holds" },
    ]);
    expect(events.map((event) => event.kind === "display" && event.update)).toEqual([false, false, false]);
    const ids = events.map((event) => (event.kind === "display" ? event.displayId : ""));
    expect(new Set(ids).size).toBe(3);
    for (const result of outcome.results)
      if (result.evidence !== null) expect(checkEvidence(result.evidence)).toMatchObject({ accepted: true });
  });

  it("has the keys of `eval --json`, in their order", async () => {
    const { run } = begin();
    const { outcome } = await run(`${order}\ncheck-finite Order\ndescribe Order\nrelation S`);
    const keys = ["statement", "text", "verdict", "summary", "steps", "data", "evidence", "diagnostics"];
    for (const result of outcome.results) expect(Object.keys(result)).toEqual(keys);
  });

  it("runs nothing when there is a mistake of form, and says all of them", async () => {
    const { run } = begin();
    const { outcome, events } = await run(`${order}\nclaim Ordr is consistent\nclaim Order ⊨ Rxy`);
    expect(events).toEqual([]);
    expect(outcome).toMatchObject({ status: "error", ename: "Mistakes" });
    const codes = outcome.results[0]!.diagnostics.map((diagnostic) => diagnostic.code);
    expect(codes.length).toBeGreaterThanOrEqual(2);
    const next = await run("describe Order");
    expect(next.outcome).toMatchObject({ status: "error", ename: "Mistakes" });
  });

  it("goes on after a claim that is not established, and ends with one error that lists those claims", async () => {
    const { run } = begin();
    const { outcome } = await run(
      `claim { ∀x Rxx } ⊨ ∀x ∀y Rxy\n${order}\nclaim Order ⊨ ∀x ∀y (Rxy → ¬Ryx)\nconjecture Order ⊨ ∃x ∃y Rxy\nclaim Order is consistent`,
    );
    expect(outcome).toMatchObject({ status: "error", ename: "FailedClaims" });
    expect(resultsOf(outcome).map(({ verdict }) => verdict)).toEqual([
      "fails",
      null,
      "holds",
      "fails",
      "holds",
    ]);
    const { traceback } = outcome as CellOutcome & { status: "error" };
    expect(traceback.join("\n")).toContain("∀x ∀y Rxy");
    expect(traceback.join("\n")).not.toContain("conjecture");
    expect((await run("check-finite Order")).outcome.status).toBe("ok");
  });

  it("keeps what a name stood for when it was used", async () => {
    const { run } = begin();
    await run(
      "define A := { a: ∀x Rxx }\ndefine B := A + { b: ∀x ∀y (Rxy → Ryx) }\ndefine A := { a: ∀x ¬Rxx }",
    );
    const { outcome } = await run("claim B ⊭ ∃x ¬Rxx\nclaim A ⊭ ∃x Rxx");
    expect(outcome.status).toBe("ok");
  });
});

/** Graphs in which any two points are joined by one or two steps in one way only: the least of these has 50 points. */
const hard =
  "{ ∀x ¬Rxx; ∀x ∀y (Rxy → Ryx); ∀x ∀y (x ≠ y → Rxy ∨ ∃z (Rxz ∧ Rzy)); ∀x ∀y ∀z ¬(Rxy ∧ Ryz ∧ Rzx); ∀x ∀y ∀z ∀w (Rxz ∧ Rzy ∧ Rxw ∧ Rwy → x = y ∨ z = w); ∀x ∃y ∃z ∃w ∃u (Rxy ∧ Rxz ∧ Rxw ∧ Rxu ∧ y ≠ z ∧ y ≠ w ∧ y ≠ u ∧ z ≠ w ∧ z ≠ u ∧ w ≠ u) }";

describe("an interrupt", () => {
  it("ends the cell, keeps what was answered and every definition", async () => {
    let polls = 0;
    const { run } = begin(() => polls++ > 40);
    const { outcome } = await run(
      `${order}\ncheck-finite ${hard} up to 18 within 10000000 steps\ndefine Late := {}`,
    );
    expect(outcome).toMatchObject({ status: "error", ename: "Interrupted" });
    const [, open] = outcome.results;
    expect(open).toMatchObject({ verdict: "open", evidence: null });
    expect(open!.summary).toMatch(/interrupted/);
    polls = Number.NEGATIVE_INFINITY;
    expect((await run("check-finite Order")).outcome.status).toBe("ok");
    expect((await run("describe Late")).outcome).toMatchObject({ ename: "Mistakes" });
  });
});

describe("reasons", () => {
  it("say that something stands among the axioms, and not that it follows from none", async () => {
    const { outcome } = await begin().run(
      "derive { ∀x Rxx } ⊨ ∀x Rxx\nderive {} ⊨ ∃x x = x\nconjecture { symmetric } is weaker than { symmetric }\nindependence { a: ∀x Rxx; b: ∀x Rxx }",
    );
    expect(outcome.results.map(({ summary }) => summary)).toEqual([
      "holds: the conclusion is one of the premises (checked)",
      "holds: follows from no axioms at all (checked)",
      "fails: the axioms of the one are among those of the other (checked)",
      "0 of 2 axioms independent; a and b redundant (checked)",
    ]);
  });
});

describe("budgets", () => {
  const cell = `check-finite ${hard} up to 30 within 100 steps`;

  it("end a search at the same place each time, and say how far it came", async () => {
    const first = await begin().run(cell);
    const second = await begin().run(cell);
    expect(first.outcome.results).toEqual(second.outcome.results);
    const [result] = first.outcome.results;
    expect(result).toMatchObject({ verdict: "open", steps: 100 });
    const { noModelUpTo } = result!.data as { noModelUpTo: number };
    expect(noModelUpTo).toBeGreaterThan(1);
    expect(noModelUpTo).toBeLessThan(30);
  });

  it("count no time: a slow clock changes progress displays and nothing else", async () => {
    let time = 0;
    const slow = await begin(
      () => false,
      () => (time += 5000),
    ).run(cell);
    const fast = await begin().run(cell);
    expect(slow.outcome.results).toEqual(fast.outcome.results);
    expect(slow.events.length).toBeGreaterThan(fast.events.length);
    const last = (events: CellEvent[]) => {
      const event = events.at(-1)!;
      return event.kind === "display" ? [event.data, event.metadata] : [];
    };
    expect(last(slow.events)).toEqual(last(fast.events));
    const ids = new Set(slow.events.map((event) => event.kind === "display" && event.displayId));
    expect(ids.size).toBe(1);
  });
});

describe("expressions for prose", () => {
  it("are verdicts, counts, formulas and definitions, short and each with its own ok or error", async () => {
    const { session, run } = begin();
    await run(`${order}\nclaim Order is consistent\ndefine A := points 2 where R is { (1,2) }`);
    const plain = async (expression: string) => {
      const outcome = await session.evaluateExpression(expression);
      return outcome.status === "ok" ? outcome.data["text/plain"] : `${outcome.ename}: ${outcome.evalue}`;
    };
    expect(await plain("verdict of claim 1")).toBe("holds");
    expect(await plain("claim 1")).toBe("claim Order is consistent");
    // Partial orders on 5 points: OEIS A001035 labelled, A000112 up to isomorphism.
    expect(await plain("labelled count of Order on 5 points")).toBe("4,231");
    expect(await plain("count of Order on 5 points")).toBe("63");
    expect(await plain("formula of Order.irr")).toBe("∀x ¬Rxx");
    expect(await plain("axioms of Order - trans")).toBe("{ irr: ∀x ¬Rxx }");
    expect(await plain("A")).toBe("points 2 where R is { (1,2) }");
    expect(await plain("verdict of claim 2")).toMatch(/^Mistakes: there is no claim 2; so far there is 1$/);
    expect(await plain("Ordr")).toMatch(/^Mistakes: .*Order/);
    expect(await plain("count of Order on 100000 points")).toMatch(/^Mistakes: .*not counted/);
    expect(await plain("")).toMatch(/^Mistakes: /);
    const formula = await session.evaluateExpression("formula of Order.irr");
    expect(formula).toMatchObject({
      status: "ok",
      data: { "text/markdown": "$\\forall x\\, \\neg Rxx$", "text/latex": "$\\forall x\\, \\neg Rxx$" },
    });
  });

  it("are reasons why there is no finite model, where a claim rests on one", async () => {
    const { session, run } = begin();
    await run(`${order}\nclaim Order + { up: ∀x ∃y Rxy } has no finite model\nclaim Order is consistent`);
    const outcome = await session.evaluateExpression("reason of claim 1");
    if (outcome.status !== "ok") throw new Error(outcome.evalue);
    expect(outcome.data["text/plain"]).toMatch(
      /^(Let|By) .* irr, trans and up, .* So every model is infinite\.$/,
    );
    expect(outcome.data["text/markdown"]).toMatch(/\$x\$ has some \$y\$ with \$/);
    expect(await session.evaluateExpression("reason of claim 2")).toMatchObject({
      status: "error",
      evalue: "claim 2 does not rest on a reason why there is no finite model",
    });
  });
});

describe("stored evidence", () => {
  it("comes back from an output's metadata, compressed when it is long", async () => {
    const { run } = begin();
    const many = Array.from({ length: 40 }, (_, i) => `l${i}: ∀x ∀y ∀z (Rxy ∧ Ryz ∧ Rzx → Rxz ∨ Ryx)`);
    const { outcome } = await run(
      `define Small := { a: ∀x Rxx }\ncheck-finite Small\nmodels { ${many.join("; ")} } of size 3`,
    );
    for (const result of outcome.results) {
      const stored = JSON.parse(JSON.stringify(storeResult(result))) as { evidence: unknown };
      expect(loadEvidence(stored.evidence)).toEqual(result.evidence);
    }
    const padded = { ...outcome.results[1]!, evidence: { ...outcome.results[1]!.evidence!, facts: [] } };
    const long = { ...padded, evidence: { ...padded.evidence, digest: "0".repeat(70_000) } };
    const stored = storeResult(long) as { evidence: { deflate: string } };
    expect(stored.evidence.deflate.length).toBeLessThan(1000);
    expect(loadEvidence(stored.evidence)).toEqual(long.evidence);
  });
});
