/**
 * HTML of unknown origin made safe for a page: what is not on the lists below is dropped, and the rest is written
 * anew, so that nothing of the input reaches the page without having been understood.
 */

/** Elements that are kept, with the attributes that each may have. */
const ELEMENTS: ReadonlyMap<string, ReadonlySet<string>> = new Map(
  Object.entries({
    a: ["href", "title"],
    abbr: ["title"],
    b: [],
    blockquote: [],
    br: [],
    caption: [],
    code: [],
    col: [],
    colgroup: [],
    dd: [],
    del: [],
    details: ["open"],
    div: [],
    dl: [],
    dt: [],
    em: [],
    figcaption: [],
    figure: [],
    h1: [],
    h2: [],
    h3: [],
    h4: [],
    h5: [],
    h6: [],
    hr: [],
    i: [],
    img: ["src", "alt", "width", "height"],
    kbd: [],
    li: [],
    ol: ["start"],
    p: [],
    pre: [],
    q: [],
    s: [],
    samp: [],
    small: [],
    span: [],
    strong: [],
    sub: [],
    summary: [],
    sup: [],
    table: [],
    tbody: [],
    td: ["colspan", "rowspan"],
    tfoot: [],
    th: ["colspan", "rowspan", "scope"],
    thead: [],
    tr: [],
    tt: [],
    u: [],
    ul: [],
    var: [],
  }).map(([name, attributes]) => [name, new Set([...attributes, "style"])]),
);

/** Elements without an end tag. */
const VOID: ReadonlySet<string> = new Set(["br", "col", "hr", "img"]);

/** Elements whose text is not for readers. */
const SILENT: ReadonlySet<string> = new Set([
  "script",
  "style",
  "template",
  "title",
  "textarea",
  "iframe",
  "noscript",
]);

const STYLES =
  /^(?:background-color|border(?:-(?:top|right|bottom|left|collapse|radius|color|style|width))?|caption-side|color|cursor|display|font-(?:family|size|style|weight|variant)|line-height|list-style-type|(?:margin|padding)(?:-(?:top|right|bottom|left))?|(?:max-|min-)?(?:width|height)|overflow(?:-[xy])?|table-layout|text-(?:align|decoration|indent|transform)|vertical-align|white-space|word-break)$/;

/** Values without functions, escapes, addresses or variables. */
const STYLE_VALUE = /^[a-z0-9#%.,\s-]+$/i;

/** Addresses that a link may have; pictures must bring their data with them. */
const LINK = /^(?:https?:\/\/|mailto:|#)[^\s"'<>`]*$/i;
const PICTURE = /^data:image\/(?:png|jpeg|gif|webp|svg\+xml);base64,[a-z0-9+/=\s]*$/i;

interface Tag {
  readonly name: string;
  readonly closes: boolean;
  readonly attributes: readonly (readonly [string, string])[];
  /** Where the text after the tag begins. */
  readonly end: number;
}

/** The input with only what is known to be harmless left in it, every element closed. */
export function sanitiseHtml(html: string): string {
  let written = "";
  let place = 0;
  const open: string[] = [];
  while (place < html.length) {
    const next = html.indexOf("<", place);
    if (next === -1) {
      written += escapeText(html.slice(place));
      break;
    }
    written += escapeText(html.slice(place, next));
    if (html.startsWith("<!--", next)) {
      const end = html.indexOf("-->", next + 4);
      place = end === -1 ? html.length : end + 3;
      continue;
    }
    const tag = readTag(html, next);
    if (tag === null) {
      written += "&lt;";
      place = next + 1;
      continue;
    }
    place = tag.end;
    if (SILENT.has(tag.name)) {
      if (!tag.closes) place = afterElement(html, tag);
      continue;
    }
    const allowed = ELEMENTS.get(tag.name);
    if (allowed === undefined) continue;
    if (!tag.closes) {
      written += `<${tag.name}${tag.attributes.map((attribute) => writeAttribute(attribute, allowed)).join("")}>`;
      if (!VOID.has(tag.name)) open.push(tag.name);
    } else if (open.includes(tag.name)) {
      // Elements that were left open inside this one end with it.
      for (let name = open.pop(); name !== undefined; name = name === tag.name ? undefined : open.pop())
        written += `</${name}>`;
    }
  }
  return (
    written +
    open
      .reverse()
      .map((name) => `</${name}>`)
      .join("")
  );
}

/** Reads a tag that begins at a `<`; null when there is none. */
function readTag(html: string, start: number): Tag | null {
  let place = start + 1;
  const closes = html[place] === "/";
  if (closes) place += 1;
  const name = /^[a-z][a-z0-9-]*/i.exec(html.slice(place, place + 40))?.[0];
  if (name === undefined) return null;
  place += name.length;
  const attributes: [string, string][] = [];
  for (;;) {
    while (/[\s/]/.test(html[place] ?? "")) place += 1;
    if (place >= html.length) return null;
    if (html[place] === ">") return { name: name.toLowerCase(), closes, attributes, end: place + 1 };
    const key = /^[^\s"'<>/=]+/.exec(html.slice(place, place + 80))?.[0];
    if (key === undefined) return null;
    place += key.length;
    while (/\s/.test(html[place] ?? "")) place += 1;
    let value = "";
    if (html[place] === "=") {
      place += 1;
      while (/\s/.test(html[place] ?? "")) place += 1;
      const quote = html[place];
      if (quote === '"' || quote === "'") {
        const end = html.indexOf(quote, place + 1);
        if (end === -1) return null;
        value = html.slice(place + 1, end);
        place = end + 1;
      } else {
        const begin = place;
        while (place < html.length && !/[\s>]/.test(html[place]!)) place += 1;
        value = html.slice(begin, place);
      }
    }
    attributes.push([key.toLowerCase(), value]);
  }
}

/** The place after the end tag of an element whose text is not for readers. */
function afterElement(html: string, tag: Tag): number {
  const found = new RegExp(`</${tag.name}[\\s>/]`, "i").exec(html.slice(tag.end));
  if (found === null) return html.length;
  const end = html.indexOf(">", tag.end + found.index);
  return end === -1 ? html.length : end + 1;
}

function writeAttribute([name, value]: readonly [string, string], allowed: ReadonlySet<string>): string {
  if (!allowed.has(name)) return "";
  const kept = keptValue(name, value);
  return kept === null
    ? ""
    : ` ${name}="${kept.replace(/"/g, "&quot;").replace(/</g, "&lt;").replace(/>/g, "&gt;")}"`;
}

function keptValue(name: string, value: string): string | null {
  switch (name) {
    case "href":
      return LINK.test(value) ? value : null;
    case "src":
      return PICTURE.test(value) ? value : null;
    case "style":
      return value
        .split(";")
        .map((declaration) => declaration.trim())
        .filter((declaration) => {
          const [property, setting, ...more] = declaration.split(":");
          return (
            more.length === 0 &&
            setting !== undefined &&
            STYLES.test(property!.trim().toLowerCase()) &&
            STYLE_VALUE.test(setting)
          );
        })
        .join(";");
    default:
      return value;
  }
}

/** Text keeps its character references; a stray `>` cannot end anything. */
function escapeText(text: string): string {
  return text.replace(/>/g, "&gt;");
}
