/** An executed notebook as one readable page that needs nothing else: no scripts, no fonts, no other files. */
import { stripVTControlCharacters } from "node:util";
import { statementHelp } from "../../lib/language/help.ts";
import { type Attachments, renderMarkdown, renderMath } from "./markdown.ts";
import { sanitiseHtml } from "./safe-html.ts";
import { escapeHtml } from "./to-html.ts";

type Lines = string | readonly string[];

/** What is read of a notebook; nbformat 4 has more. */
export interface ReadableNotebook {
  readonly cells: readonly ReadableCell[];
}

export interface ReadableCell {
  readonly cell_type: string;
  readonly source: Lines;
  readonly outputs?: readonly ReadableOutput[];
  readonly execution_count?: number | null;
  readonly attachments?: Readonly<Record<string, Readonly<Record<string, unknown>>>> | undefined;
}

export interface ReadableOutput {
  readonly output_type: string;
  readonly data?: Readonly<Record<string, unknown>>;
  readonly name?: string;
  readonly text?: Lines;
  readonly ename?: string;
  readonly evalue?: string;
  readonly traceback?: readonly string[];
}

/**
 * The page. Markdown's raw HTML is shown as text; HTML of outputs is kept as far as it is harmless.
 * @param title the page's name, for the tab and for readers of the list of pages
 */
export function notebookToHtml(notebook: ReadableNotebook, title: string): string {
  const cells = notebook.cells.map((cell, index) => renderCell(cell, index + 1));
  return `<!DOCTYPE html>
<html lang="en">
<head>
<meta charset="utf-8">
<meta name="viewport" content="width=device-width, initial-scale=1">
<title>${escapeHtml(title)}</title>
<style>
${PAGE_STYLE}</style>
</head>
<body>
<main>
${cells.join("\n")}
</main>
</body>
</html>
`;
}

function renderCell(cell: ReadableCell, number: number): string {
  const source = joined(cell.source);
  if (cell.cell_type === "markdown") return renderMarkdown(source, (cell.attachments ?? {}) as Attachments);
  if (cell.cell_type !== "code") return `<pre tabindex="0">${escapeHtml(source)}</pre>`;
  const count = cell.execution_count ?? null;
  const label = count === null ? `Cell ${number}` : `Cell ${number}, run ${count}`;
  const outputs = (cell.outputs ?? []).map(renderOutput).filter(Boolean);
  const shown = outputs.length === 0 ? "" : `\n<div class="output">${outputs.join("\n")}</div>`;
  return `<section aria-label="${label}">\n<pre class="source" tabindex="0"><code>${markUp(source)}</code></pre>${shown}\n</section>`;
}

function renderOutput(output: ReadableOutput): string {
  switch (output.output_type) {
    case "display_data":
    case "execute_result":
      return renderBundle(output.data ?? {});
    case "stream":
      return `<pre tabindex="0">${escapeHtml(stripVTControlCharacters(joined(output.text ?? "")))}</pre>`;
    case "error": {
      const lines = output.traceback ?? [];
      const text = stripVTControlCharacters(lines.join("\n"));
      const head = `${output.ename ?? "Error"}: ${output.evalue ?? ""}`;
      return `<pre class="error" tabindex="0">${escapeHtml(text.includes(output.evalue ?? "") && text !== "" ? text : `${head}\n${text}`)}</pre>`;
    }
    default:
      return "";
  }
}

/** The richest form that a page can show. */
function renderBundle(data: Readonly<Record<string, unknown>>): string {
  const form = (type: string) => {
    const value = data[type];
    return typeof value === "string" || Array.isArray(value) ? joined(value as Lines) : null;
  };
  const html = form("text/html");
  if (html !== null) return sanitiseHtml(html);
  const markdown = form("text/markdown");
  if (markdown !== null) return renderMarkdown(markdown);
  const latex = form("text/latex");
  if (latex !== null) {
    const mathematics = /^\s*(\$\$?)([^$]+)\1\s*$/.exec(latex);
    if (mathematics !== null) return `<p>${renderMath(mathematics[2]!, mathematics[1] === "$$")}</p>`;
    return `<pre tabindex="0">${escapeHtml(latex)}</pre>`;
  }
  const plain = form("text/plain");
  return plain === null ? "" : `<pre tabindex="0">${escapeHtml(plain)}</pre>`;
}

function joined(text: Lines): string {
  return typeof text === "string" ? text : text.join("");
}

const STATEMENTS: ReadonlySet<string> = new Set(statementHelp.map(({ word }) => word));

/** Cell text with its comments and the words that begin statements marked. */
function markUp(source: string): string {
  return source
    .split("\n")
    .map((text) => {
      const comment = text.indexOf("#");
      const code = comment === -1 ? text : text.slice(0, comment);
      const note = comment === -1 ? "" : `<i>${escapeHtml(text.slice(comment))}</i>`;
      const word = /^\s*([a-z-]+)/.exec(code)?.[1];
      if (word === undefined || !STATEMENTS.has(word)) return escapeHtml(code) + note;
      const end = code.indexOf(word) + word.length;
      return `${escapeHtml(code.slice(0, end - word.length))}<b>${word}</b>${escapeHtml(code.slice(end))}${note}`;
    })
    .join("\n");
}

const PAGE_STYLE = `:root { color-scheme: light dark; --page: #ffffff; --ink: #1d2126; --quiet: #5a6068; --rule: #d4d2cb; --sheet: #f5f3ec; --mark: #1b5558; --alarm: #8c2f3f; }
@media (prefers-color-scheme: dark) {
  :root { --page: #14171b; --ink: #e3e1da; --quiet: #a2a8b0; --rule: #3b4047; --sheet: #1e2227; --mark: #86c5c4; --alarm: #f0a0a8; }
}
* { box-sizing: border-box; }
body { margin: 0; background: var(--page); color: var(--ink); font: 1.0625rem/1.6 Charter, "Bitstream Charter", Cambria, Georgia, serif; }
main { max-width: 46rem; margin: 0 auto; padding: 2.5rem 1.25rem 5rem; }
h1, h2, h3, h4 { line-height: 1.25; margin: 2.2em 0 0.6em; text-wrap: balance; }
h1 { font-size: 1.9rem; margin-top: 0.5em; }
h2 { font-size: 1.4rem; }
h3 { font-size: 1.15rem; }
a { color: var(--mark); }
a:focus-visible, pre:focus-visible, summary:focus-visible { outline: 2px solid var(--mark); outline-offset: 2px; }
section { margin: 1.4rem 0; }
pre, code, samp { font-family: ui-monospace, "DejaVu Sans Mono", Menlo, Consolas, monospace; font-size: 0.875rem; }
pre { margin: 0.5rem 0; overflow-x: auto; line-height: 1.5; }
.source { background: var(--sheet); border: 1px solid var(--rule); border-radius: 4px; padding: 0.7rem 0.9rem; margin: 0; }
.source b { color: var(--mark); }
.source i { color: var(--quiet); }
.output { padding: 0.5rem 0 0 0.9rem; font-family: system-ui, "Helvetica Neue", Arial, sans-serif; font-size: 0.9375rem; }
.output > div + div { border-top: 1px solid var(--rule); margin-top: 0.6rem; padding-top: 0.4rem; }
.error { color: var(--alarm); border-left: 3px solid var(--alarm); padding-left: 0.8rem; }
blockquote { margin: 1rem 0; padding-left: 1rem; border-left: 3px solid var(--rule); color: var(--quiet); }
main > table, main > blockquote table { border-collapse: collapse; margin: 1rem 0; }
main > table :is(th, td) { border-bottom: 1px solid var(--rule); padding: 0.25rem 0.9rem 0.25rem 0.2rem; text-align: left; }
img { max-width: 100%; height: auto; }
@media print {
  :root { --page: #ffffff; --ink: #000000; --quiet: #444444; --rule: #bbbbbb; --sheet: #ffffff; --mark: #000000; --alarm: #000000; }
  main { max-width: none; padding: 0; }
  pre { white-space: pre-wrap; }
  .source, img, tr { break-inside: avoid; }
  h1, h2, h3 { break-after: avoid; }
  details::details-content { content-visibility: visible; block-size: auto; }
}
`;
