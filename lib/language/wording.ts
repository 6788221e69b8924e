/** Turns of phrase that messages share. */

/** "1 place", "3 places". */
export function countOf(count: number, noun: string): string {
  return `${count === 0 ? "no" : count} ${noun}${count === 1 ? "" : "s"}`;
}

/** How an application looks: `R(x, y)`. */
export function callForm(
  name: string,
  places: number,
  variables: readonly string[] = "xyzuvw".split(""),
): string {
  if (places === 0) return name;
  if (places > variables.length) return `${name}(x1, …, x${places})`;
  return `${name}(${variables.slice(0, places).join(", ")})`;
}

/** A kind of name with its article. */
export function kindText(kind: "relation" | "formula" | "theory" | "structure"): string {
  return `a ${kind}`;
}
