/** The page of an executed notebook, and the cleaning of HTML that it relies on. */
import fc from "fast-check";
import { describe, expect, it } from "vitest";
import { renderMarkdown } from "../kernel/display/markdown.ts";
import { notebookToHtml, type ReadableCell, type ReadableOutput } from "../kernel/display/notebook-html.ts";
import { sanitiseHtml } from "../kernel/display/safe-html.ts";
import { readMarkup } from "./support/markup.ts";

function codeCell(source: string, ...outputs: ReadableOutput[]): ReadableCell {
  return { cell_type: "code", source, outputs, execution_count: 1 };
}

function displayed(data: Record<string, unknown>): ReadableOutput {
  return { output_type: "display_data", data };
}

/** The page's body, read strictly. */
function bodyOf(...cells: ReadableCell[]) {
  const page = notebookToHtml({ cells }, "A page");
  const body = page.slice(page.indexOf("<body>"), page.indexOf("</html>"));
  return { page, body, ...readMarkup(body) };
}

describe("notebookToHtml", () => {
  it("makes a page that needs nothing else", () => {
    const { page, elements } = bodyOf({
      cell_type: "markdown",
      source: ["# Title\n", "\n", "[link](https://example.org/)"],
    });
    expect(page).toMatch(/^<!DOCTYPE html>\n<html lang="en">/);
    expect(page).toContain("<title>A page</title>");
    expect(page).not.toMatch(/<script|<link|@import|url\(/);
    expect(elements.map(({ name }) => name)).toEqual(["body", "main", "h1", "p", "a"]);
  });

  it("takes HTML before Markdown before LaTeX before plain text", () => {
    const forms: Record<string, string> = {
      "text/plain": "four",
      "text/latex": "$x_3$",
      "text/markdown": "*two*",
      "text/html": "<b>one</b>",
    };
    const shown: string[] = [];
    for (const type of ["text/html", "text/markdown", "text/latex", "text/plain"]) {
      shown.push(bodyOf(codeCell("", displayed(forms))).body);
      delete forms[type];
    }
    expect(shown[0]).toContain("<b>one</b>");
    expect(shown[1]).toContain("<em>two</em>");
    expect(shown[2]).toContain("<math>");
    expect(shown[3]).toContain('<pre tabindex="0">four</pre>');
  });

  it("shows streams and errors as text, without control sequences", () => {
    const { text, body } = bodyOf(
      codeCell(
        "claim <A>",
        { output_type: "stream", name: "stdout", text: ["a <b>\n", "\u001b[31mred\u001b[0m"] },
        {
          output_type: "error",
          ename: "Mistakes",
          evalue: "no name <A>",
          traceback: ["line 1: no name <A>", "  ^"],
        },
      ),
    );
    expect(text).toContain("a <b>\nred");
    expect(text).toContain("line 1: no name <A>\n  ^");
    expect(body).toContain('class="error"');
  });

  it("marks the words that begin statements, and comments", () => {
    const { body } = bodyOf(codeCell("define A := {} # claim\nclaim A is consistent"));
    expect(body).toContain("<b>define</b> A := {} <i># claim</i>");
    expect(body).toContain("<b>claim</b> A is consistent");
  });

  it("shows raw HTML of Markdown as text and fetches no pictures", () => {
    const { elements, text } = bodyOf({
      cell_type: "markdown",
      source: "<script>x</script> a <b onclick=y>b</b>\n\n![p](https://example.org/p.png) [q](javascript:z)",
    });
    expect(elements.map(({ name }) => name)).not.toContain("script");
    expect(elements.map(({ name }) => name)).not.toContain("img");
    expect(elements.map(({ name }) => name)).not.toContain("a");
    expect(text).toContain("<script>x</script>");
  });

  it("shows pictures that the cell carries", () => {
    const { elements } = bodyOf({
      cell_type: "markdown",
      source: "![a plan](attachment:plan.png)",
      attachments: { "plan.png": { "image/png": "iVBORw0KGgo=" } },
    });
    const picture = elements.find(({ name }) => name === "img")!;
    expect(picture.attributes.get("src")).toBe("data:image/png;base64,iVBORw0KGgo=");
    expect(picture.attributes.get("alt")).toBe("a plan");
  });

  it("closes what an output leaves open", () => {
    const { text } = bodyOf(codeCell("", displayed({ "text/html": "<div><b>left open" })), {
      cell_type: "markdown",
      source: "after",
    });
    expect(text).toContain("left open");
  });
});

describe("mathematics in Markdown", () => {
  it.each([
    ["inline", "so $x \\leq y$ holds", 1],
    ["displayed", "so\n\n$$x \\leq y$$\n\nholds", 1],
    ["two in a line", "$x$ and $y$", 2],
    ["prices", "it costs $5 or $6", 0],
    ["in code", "`$x$`", 0],
    ["unreadable", "$\\frac{$", 0],
  ])("%s", (_, markdown, count) => {
    expect(renderMarkdown(markdown).split("<math").length - 1).toBe(count);
  });
});

it("keeps a comma with the mathematics before it", () => {
  expect(renderMarkdown("$x$, and $y$ too")).toMatch(
    /<span style="white-space:nowrap"><math>.*<\/math>,<\/span> and <math>/,
  );
});

describe("sanitiseHtml", () => {
  it.each([
    ["<script>alert(1)</script>after", "after"],
    ["<SCRIPT src=x></SCRIPT >after", "after"],
    ["<img src=x onerror=alert(1)>", "<img>"],
    [
      '<img src="data:image/svg+xml;base64,AAAA" alt="a&quot;b">',
      '<img src="data:image/svg+xml;base64,AAAA" alt="a&quot;b">',
    ],
    ['<a href="javascript:alert(1)">x</a>', "<a>x</a>"],
    ['<a href="&#106;avascript:alert(1)">x</a>', "<a>x</a>"],
    ['<a href="https://example.org/?a=1">x</a>', '<a href="https://example.org/?a=1">x</a>'],
    ['<p style="color:red;background:url(x);position:fixed">x</p>', '<p style="color:red">x</p>'],
    ["<svg><script>x</script></svg>y", "y"],
    ["<b>x</i></b>", "<b>x</b>"],
    ["<div><b>x</div>y", "<div><b>x</b></div>y"],
    ["1 < 2 > 0", "1 &lt; 2 &gt; 0"],
    ["<!-- <b> -->x", "x"],
    ["<b title='\"><script>'>x</b>", "<b>x</b>"],
    ["<p", "&lt;p"],
    ['<p style="a', '&lt;p style="a'],
  ])("%s", (html, safe) => {
    expect(sanitiseHtml(html)).toBe(safe);
  });

  it("leaves well-formed markup of listed elements, whatever comes in", () => {
    const pieces = fc.constantFrom(
      "<",
      ">",
      "</",
      "/>",
      "<b>",
      "</b>",
      "<script>",
      "</script>",
      "<p ",
      "style=",
      '"',
      "'",
      "on=",
      "img",
      " ",
      "x",
      "<!--",
      "-->",
      "=",
      "<td>",
    );
    fc.assert(
      fc.property(fc.array(pieces, { maxLength: 25 }), (list) => {
        const safe = sanitiseHtml(list.join(""));
        const { elements } = readMarkup(safe);
        expect(elements.map(({ name }) => name)).not.toContain("script");
        for (const { attributes } of elements)
          expect([...attributes.keys()].filter((key) => key !== "style")).toEqual([]);
        expect(sanitiseHtml(safe)).toBe(safe);
      }),
      { seed: 20260403, numRuns: 2000 },
    );
  });
});
