/**
 * Modal axioms and the frame conditions that they correspond to (van Benthem 1983; Blackburn, de Rijke & Venema
 * 2001; from memory): a condition evaluated by Twoplace against validity by all valuations, on every frame.
 */
import { describe, expect, it } from "vitest";
import { Points } from "../lib/carriers/points.ts";
import { Meter } from "../lib/logic/meter.ts";
import { satisfies } from "../lib/structures/evaluate.ts";
import { readSentences, values } from "./support/corpora.ts";
import { isValidOn, readModal } from "./support/modal.ts";

const R = { name: "R", places: 2, infix: false };
const entries = values.filter((entry) => entry.id.startsWith("c-corr"));

/** The frame with this number: bit x·n + y says whether y is a successor of x. */
function frame(size: number, code: number) {
  const holds = Uint8Array.from({ length: size * size }, (_, kind) => (code >> kind) & 1);
  const structure = { carrier: new Points(size), tables: new Map([["R", { relation: R, holds }]]) };
  const successors = Array.from({ length: size }, (_, x) => (code >> (x * size)) & (2 ** size - 1));
  return { structure, successors };
}

describe("frame conditions", () => {
  it.each(entries.map((entry) => [entry.id, entry] as const))("%s", (_, entry) => {
    const [, axiom, condition] = /^modal axiom (.*) is valid on a frame iff the frame satisfies: (.*)$/.exec(
      entry.statement as string,
    )!;
    const modal = readModal(axiom!);
    const [sentence] = readSentences([condition!]);
    const counts = (entry.expected as { "valid_frames_on_1..n": number[] })["valid_frames_on_1..n"];
    const meter = new Meter(1e9);
    for (const [index, count] of counts.entries()) {
      const size = index + 1;
      let satisfied = 0;
      for (let code = 0; code < 2 ** (size * size); code += 1) {
        const { structure, successors } = frame(size, code);
        const holds = satisfies(structure, sentence!, meter);
        if (holds) satisfied += 1;
        // Valuations of two letters on all frames of 4 points would take minutes: sizes up to 3 for the axiom itself.
        if (size <= 3 && holds !== isValidOn(modal, successors))
          expect.fail(`${axiom} and ${condition} differ on frame ${code} of ${size} points`);
      }
      expect(satisfied, `on ${size} points`).toBe(count);
    }
  });
});
