/**
 * How long a search goes on before it looks for an interrupt: the longest time between two polls, over questions that
 * keep each part of the search busy.
 *
 *     npx tsx tests/benchmarks/interrupt.ts
 *
 * Wall-clock time, so that a loaded machine makes it longer. A cell stops one poll after the interrupt is asked for.
 */
import { Session } from "../../kernel/session/session.ts";

const cells: Readonly<Record<string, string>> = {
  "laying out many clauses": "relation P of 1 place\nmodels { ∀x ∀y ∀z (Px ∨ Py ∨ ¬Pz) } of size 100",
  "a large table": "models { ∀x ∃y Rxy } of size 490",
  "a search without a model":
    "check-finite { tournament; ∀x ∀y ∀z ∃w (Rwx ∧ Rwy ∧ Rwz) } up to 14 within 60000 steps",
  "eight variables":
    "relation R\nrelation V of 3 places\nrelation W of 3 places\ncheck-finite { ∀x ∀y ∀u (V(x,y,u) ↔ ∀z (Rzu ↔ Rzx ∨ Rzy)); ∀x ∀y ∀u (W(x,y,u) ↔ ∀z (Rzu ↔ Rzx ∧ Rzy)); ∃x ∃y ∃z ∃a ∃b ∃c ∃d ∃e (V(y,z,a) ∧ W(x,a,b) ∧ W(x,y,c) ∧ W(x,z,d) ∧ V(c,d,e) ∧ b ≠ e); ∀x ∀y (∀z (Rzx ↔ Rzy) → x = y) } up to 4 within 20000 steps",
  counting: "count { transitive } up to 6",
  models: "models { symmetric } of size 6",
  "derivations without an end":
    "check-finite { transitive; irreflexive; ∀x ∃y Rxy } up to 2 within 400000 steps",
  "derivations with identity":
    "check-finite { ∀x ∃y Rxy; ∀x ∀y ∀z (Rxy ∧ Rxz → y = z); ∀x ∀y ∀z (Rxz ∧ Ryz → x = y); ∃x ∀y ¬Ryx } up to 2 within 400000 steps",
  evaluation:
    "define A := points 60 where R is { (1,2) }\nconjecture A ⊨ ∀x ∀y ∀z ∀w (Rxy ∧ Ryz ∧ Rzw → Rxw)",
};

for (const [name, code] of Object.entries(cells)) {
  let last = performance.now();
  let longest = 0;
  let polls = 0;
  const session = new Session({
    isInterrupted: () => {
      const now = performance.now();
      longest = Math.max(longest, now - last);
      last = now;
      polls += 1;
      return false;
    },
    clock: () => 0,
  });
  await session.runCell("describe R", () => undefined);
  longest = 0;
  polls = 0;
  last = performance.now();
  const outcome = await session.runCell(code, () => {
    // Showing a result is not searching: the time it takes is left out.
    last = performance.now();
  });
  const summary = outcome.results.at(-1)?.summary ?? "";
  process.stdout.write(
    `${name}: longest time between polls ${longest.toFixed(0)} ms of ${polls} polls; ${summary}\n`,
  );
}
