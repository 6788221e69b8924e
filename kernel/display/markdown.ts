/** Markdown cells as HTML: raw HTML is shown as text, mathematics becomes MathML, pictures must be inside the cell. */
import { Marked, type Tokens } from "marked";
import temml from "temml";
import { escapeHtml } from "./to-html.ts";

/** Pictures that a cell carries, by file name; each is a bundle of one picture in base64. */
export type Attachments = Readonly<Record<string, Readonly<Record<string, unknown>>>>;

/** LaTeX mathematics as MathML; what cannot be read is shown as it was written. */
export function renderMath(latex: string, isDisplayed: boolean): string {
  try {
    return temml.renderToString(latex, { displayMode: isDisplayed, throwOnError: true, trust: false });
  } catch {
    return `<code>${escapeHtml(latex)}</code>`;
  }
}

export function renderMarkdown(markdown: string, attachments: Attachments = {}): string {
  const marked = new Marked({ gfm: true, async: false });
  marked.use({
    extensions: [
      {
        name: "displayedMath",
        level: "block",
        start: (text: string) => indexOrNothing(text.indexOf("$$")),
        tokenizer(text: string) {
          const found = /^\$\$([\s\S]+?)\$\$[ \t]*(?:\n+|$)/.exec(text);
          return found === null ? undefined : { type: "displayedMath", raw: found[0], text: found[1]! };
        },
        renderer: (token) =>
          `<p>${renderMath((token as unknown as { text: string }).text.trim(), true)}</p>\n`,
      },
      {
        name: "math",
        level: "inline",
        start: (text: string) => indexOrNothing(text.indexOf("$")),
        tokenizer(text: string) {
          const displayed = /^\$\$([^$]+)\$\$/.exec(text);
          if (displayed !== null)
            return { type: "math", raw: displayed[0], text: displayed[1]!, displayed: true };
          // A dollar sign before a digit is a price, and one beside a space is no mathematics.
          const found = /^\$((?:\\[\s\S]|[^$\\])+)\$(?!\d)/.exec(text);
          if (found === null || /^\s|\s$/.test(found[1]!)) return undefined;
          return { type: "math", raw: found[0], text: found[1]!, displayed: false };
        },
        renderer(token) {
          const { text, displayed } = token as unknown as { text: string; displayed: boolean };
          return renderMath(text.trim(), displayed);
        },
      },
    ],
    renderer: {
      html: ({ text }: Tokens.HTML | Tokens.Tag) => escapeHtml(text),
      link({ href, title, tokens }: Tokens.Link) {
        const text = this.parser.parseInline(tokens);
        if (!/^(?:https?:\/\/|mailto:|#)/i.test(href)) return text;
        const hint = title ? ` title="${escapeHtml(title)}"` : "";
        return `<a href="${escapeHtml(href)}"${hint}>${text}</a>`;
      },
      image({ href, text }: Tokens.Image) {
        const data = pictureData(href, attachments);
        if (data === null) return `<em>[picture: ${escapeHtml(text || href)}]</em>`;
        return `<img src="${data}" alt="${escapeHtml(text)}">`;
      },
    },
  });
  const html = marked.parse(markdown) as string;
  // A line may break before and after mathematics, but not before the comma or full stop that belongs to it.
  return html.replace(
    /<math>(?:(?!<\/?math)[\s\S])*<\/math>[,.;:)]/g,
    (whole) => `<span style="white-space:nowrap">${whole}</span>`,
  );
}

function indexOrNothing(index: number): number | undefined {
  return index === -1 ? undefined : index;
}

/** A data URI for a picture that the cell carries; null for one that would have to be fetched. */
function pictureData(href: string, attachments: Attachments): string | null {
  if (/^data:image\/(?:png|jpeg|gif|webp|svg\+xml);base64,[a-z0-9+/=]*$/i.test(href)) return href;
  const name = /^attachment:(.+)$/.exec(href)?.[1];
  if (name === undefined) return null;
  for (const [type, data] of Object.entries(attachments[decodeURIComponent(name)] ?? {}))
    if (
      /^image\/(?:png|jpeg|gif|webp)$/.test(type) &&
      typeof data === "string" &&
      /^[a-z0-9+/=\s]*$/i.test(data)
    )
      return `data:${type};base64,${data.replace(/\s/g, "")}`;
  return null;
}
