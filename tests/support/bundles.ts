/** What must hold of every bundle that is sent to a front end. */
import { expect } from "vitest";
import { sanitiseHtml } from "../../kernel/display/safe-html.ts";
import type { MimeBundle } from "../../kernel/session/evaluator.ts";
import { readMarkup } from "./markup.ts";

/** The elements and attributes that stay in a notebook nobody has signed. */
const KEPT = new Map<string, readonly string[]>(
  Object.entries({
    div: [], p: [], span: [], strong: [], code: [], small: [], pre: [], br: [], details: [], summary: [],
    table: [], caption: [], thead: [], tbody: [], tr: [], td: [], th: ["scope"], img: ["src", "alt"],
  }), // biome-ignore format: a list
);

/** Checks everything that a bundle must be, whatever it shows. */
export function checkBundle(bundle: MimeBundle): void {
  expect(["text/html", "text/latex", "text/plain"]).toEqual(expect.arrayContaining(Object.keys(bundle)));
  expect(bundle["text/plain"]).toBeTruthy();
  expect(bundle["text/plain"]).not.toContain("\u001b");
  const html = bundle["text/html"]!;
  for (const { name, attributes } of readMarkup(html).elements) {
    for (const key of attributes.keys()) if (key !== "style") expect(KEPT.get(name), name).toContain(key);
    expect(KEPT.has(name), name).toBe(true);
    expect(attributes.get("style") ?? "").not.toMatch(/var\(|url\(|!important/);
    const colours = /(?:^|;)color:/.test(attributes.get("style") ?? "");
    if (colours) expect(attributes.get("style")).toMatch(/background-color:/);
    if (name === "img") checkPicture(attributes);
  }
  // What a sanitiser with the lists of a front end would leave is all of it.
  expect(sanitiseHtml(html)).toBe(html);
  if (bundle["text/latex"] !== undefined) checkLatex(bundle["text/latex"]);
}

function checkPicture(attributes: ReadonlyMap<string, string>): void {
  expect(attributes.get("alt")).toMatch(
    /^Drawing of (\d+ points?\.|\d+ of infinitely many elements\.|\d+ theories: )/,
  );
  const data = /^data:image\/svg\+xml;base64,(.*)$/.exec(attributes.get("src")!)![1]!;
  const svg = readMarkup(Buffer.from(data, "base64").toString("utf8"), []);
  expect(svg.elements[0]!.name).toBe("svg");
  // The first thing drawn is the card that the rest lies on.
  expect(svg.elements[1]).toMatchObject({ name: "rect" });
}

/** Braces and environments close in order, and dollar signs come in pairs. */
function checkLatex(latex: string): void {
  const bare = latex.replace(/\\[\\{}$&#%_]/g, "");
  let depth = 0;
  for (const character of bare) {
    if (character === "{") depth += 1;
    if (character === "}") depth -= 1;
    expect(depth).toBeGreaterThanOrEqual(0);
  }
  expect(depth).toBe(0);
  expect(bare.split("$").length % 2).toBe(1);
  const open: string[] = [];
  for (const [, word, name] of bare.matchAll(/\\(begin|end)\{(\w+)\}/g))
    if (word === "begin") open.push(name!);
    else expect(open.pop()).toBe(name);
  expect(open).toEqual([]);
}
