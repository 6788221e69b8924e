/** A strict reader of markup for tests: every tag is closed in order, every attribute is quoted and occurs once. */

export interface MarkupElement {
  readonly name: string;
  readonly attributes: ReadonlyMap<string, string>;
}

export interface Markup {
  /** In order of their start tags. */
  readonly elements: readonly MarkupElement[];
  /** All text, character references resolved. */
  readonly text: string;
}

const REFERENCES: ReadonlyMap<string, string> = new Map([
  ["amp", "&"],
  ["lt", "<"],
  ["gt", ">"],
  ["quot", '"'],
  ["#39", "'"],
]);

/**
 * Reads markup or throws an error that says what is wrong.
 * @param voids elements without an end tag; those of XML end themselves with `/>`
 */
export function readMarkup(markup: string, voids: readonly string[] = ["br", "img", "hr", "meta"]): Markup {
  const elements: MarkupElement[] = [];
  const open: string[] = [];
  let text = "";
  let place = 0;
  while (place < markup.length) {
    const next = markup.indexOf("<", place);
    text += resolve(markup.slice(place, next === -1 ? undefined : next));
    if (next === -1) break;
    const end = /^<\/([a-z][a-z0-9]*)>/i.exec(markup.slice(next));
    if (end !== null) {
      const name = open.pop();
      if (name !== end[1]) throw new Error(`</${end[1]}> closes <${name}>`);
      place = next + end[0].length;
      continue;
    }
    const start = /^<([a-z][a-z0-9]*)((?:\s[a-z:-]+="[^"<>]*")*)\s*(\/?)>/i.exec(markup.slice(next));
    if (start === null) throw new Error(`no tag: ${markup.slice(next, next + 60)}`);
    const attributes = new Map<string, string>();
    for (const [, key, value] of start[2]!.matchAll(/\s([a-z:-]+)="([^"]*)"/gi)) {
      if (attributes.has(key!)) throw new Error(`${key} twice`);
      attributes.set(key!, resolve(value!));
    }
    elements.push({ name: start[1]!, attributes });
    if (start[3] !== "/" && !voids.includes(start[1]!)) open.push(start[1]!);
    place = next + start[0].length;
  }
  if (open.length > 0) throw new Error(`not closed: ${open.join(", ")}`);
  return { elements, text };
}

function resolve(text: string): string {
  if (text.includes(">")) throw new Error(`a bare > in: ${text}`);
  return text.replace(/&([^;\s]*);?/g, (whole, name: string) => {
    const character = REFERENCES.get(name);
    if (character === undefined) throw new Error(`no such character reference: ${whole}`);
    return character;
  });
}
