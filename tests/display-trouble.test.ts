/** Tracebacks: the caret stands under the place, however wide the characters before it are. */
import { describe, expect, it } from "vitest";
import { displayWidth } from "../kernel/display/text.ts";
import { showTrouble } from "../kernel/display/trouble.ts";

/** A mistake at the first occurrence of some text. */
function mistakeAt(text: string, part: string, suggestion: string | null = null) {
  const from = Array.from(text.slice(0, text.indexOf(part))).length;
  return {
    code: "unknown-name",
    message: `no name ${part}`,
    suggestion,
    from,
    to: from + Array.from(part).length,
  };
}

/** The part of the cell's line that the carets stand under, by columns. */
function marked(lines: readonly string[], index = 0): string {
  const line = lines[index + 1]!;
  const carets = lines[index + 2]!;
  const first = displayWidth(carets.slice(0, carets.indexOf("^")));
  const last = displayWidth(carets);
  let column = 0;
  let found = "";
  for (const character of line) {
    const width = displayWidth(character);
    // A combining mark has no column of its own and goes with what stands before it.
    if (width === 0 ? column > first && column <= last : column >= first && column < last) found += character;
    column += width;
  }
  return found;
}

describe("tracebacks", () => {
  it("show line, number, caret and suggestion", () => {
    const text = "define A := {}\nclaim Ordr ⊨ ∀x ¬Rxx\n";
    expect(showTrouble([mistakeAt(text, "Ordr", "did you mean Order?")], text)).toEqual([
      "line 2, column 7: no name Ordr",
      "  2 │ claim Ordr ⊨ ∀x ¬Rxx",
      "    │       ^^^^",
      "      did you mean Order?",
    ]);
  });

  it.each([
    ["signs", "∀x ∀y ¬Foo", "Foo"],
    ["wide characters", "claim 強い順序 ⊨ Foo", "Foo"],
    ["characters beyond the basic plane", "𝔄 ⊨ 𝔅oo(x)", "𝔅oo"],
    ["a combining mark before", "cafe\u0301 ⊨ Foo", "Foo"],
    ["a combining mark inside", "claim Ne\u0301e ⊨ x", "Ne\u0301e"],
    ["wide characters inside", "claim 順序 ⊨ x", "順序"],
  ])("stand under the place after or in %s", (_, text, part) => {
    expect(marked(showTrouble([mistakeAt(text, part)], text))).toBe(part);
  });

  it("align after tabs", () => {
    const text = "\t\tirr:\tFoo";
    const lines = showTrouble([mistakeAt(text, "Foo")], text);
    expect(lines[1]).not.toContain("\t");
    expect(marked(lines)).toBe("Foo");
  });

  it.each([
    ["at the end of the text", "claim", 5, 5, "line 1, column 6"],
    ["in an empty cell", "", 0, 0, "line 1, column 1"],
    ["after the last line feed", "claim\n", 6, 6, "line 2, column 1"],
    ["at a line feed", "a\nb", 1, 2, "line 1, column 2"],
    ["beyond the text", "abc", 90, 95, "line 1, column 4"],
    ["after a carriage return", "a\rb\r\nc", 5, 6, "line 3, column 1"],
  ])("have one caret for a place %s", (_, text, from, to, head) => {
    const lines = showTrouble([{ code: "x", message: "m", suggestion: null, from, to }], text);
    expect(lines[0]).toBe(`${head}: m`);
    expect(lines[2]!.trim().replace(/^│\s*/, "")).toBe("^");
  });

  it("say where a place of several lines ends, and mark its first line", () => {
    const lines = showTrouble(
      [{ code: "x", message: "m", suggestion: null, from: 9, to: 22 }],
      "define A { irr: x\ntrans: y }",
    );
    expect(lines[0]).toBe("line 1, column 10 to line 2: m");
    expect(marked(lines)).toBe("{ irr: x");
  });

  it("cut a long line around the place", () => {
    const text = `${"∀x ".repeat(100_000)}Foo${" ∧ Rxx".repeat(100_000)}`;
    const lines = showTrouble([mistakeAt(text, "Foo")], text);
    expect(Math.max(...lines.map(displayWidth))).toBeLessThan(120);
    expect(marked(lines)).toBe("Foo");
    expect(lines[1]).toMatch(/│ ….*…$/);
  });

  it("separate mistakes, and count those that are too many to show", () => {
    const text = "a b c";
    const some = showTrouble([mistakeAt(text, "a"), mistakeAt(text, "c")], text);
    expect(some).toHaveLength(7);
    expect(marked(some, 4)).toBe("c");
    const many = showTrouble(
      Array.from({ length: 50 }, () => mistakeAt(text, "b")),
      text,
    );
    expect(many.at(-1)).toBe("and 30 more mistakes");
  });

  it("show control characters in the line as signs of their own", () => {
    const text = "claim \u202e\u0007 Foo";
    const lines = showTrouble([mistakeAt(text, "Foo")], text);
    expect(lines.join("\n")).not.toMatch(/\u202e|(?!\n)\p{Cc}/u);
    expect(marked(lines)).toBe("Foo");
  });
});
