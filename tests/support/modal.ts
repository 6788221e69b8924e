/** Modal formulas and their validity on frames, by all valuations: the outside view of a frame condition. */

export type Modal =
  | { readonly kind: "letter"; readonly name: string }
  | { readonly kind: "false" }
  | { readonly kind: "not" | "box" | "diamond"; readonly body: Modal }
  | { readonly kind: "and" | "or" | "implies"; readonly left: Modal; readonly right: Modal };

/** Reads `[]p -> <>p`: `[]`, `<>`, `~`, `&`, `|`, `->` (weakest, to the right), letters and `F`. */
export function readModal(text: string): Modal {
  const tokens = text.match(/\[\]|<>|->|[~&|()]|[a-z]|F/g) ?? [];
  if (tokens.join("") !== text.replace(/\s/g, "")) throw new Error(`cannot read ${text}`);
  let next = 0;
  const result = implication();
  if (next !== tokens.length) throw new Error(`cannot read ${text} beyond ${tokens[next]}`);
  return result;

  function implication(): Modal {
    const left = binary("|", "or", () => binary("&", "and", unary));
    if (tokens[next] !== "->") return left;
    next += 1;
    return { kind: "implies", left, right: implication() };
  }
  function binary(sign: string, kind: "and" | "or", part: () => Modal): Modal {
    let left = part();
    while (tokens[next] === sign) {
      next += 1;
      left = { kind, left, right: part() };
    }
    return left;
  }
  function unary(): Modal {
    const token = tokens[next++];
    if (token === "[]") return { kind: "box", body: unary() };
    if (token === "<>") return { kind: "diamond", body: unary() };
    if (token === "~") return { kind: "not", body: unary() };
    if (token === "F") return { kind: "false" };
    if (token === "(") {
      const inner = implication();
      if (tokens[next++] !== ")") throw new Error(`a bracket is missing in ${text}`);
      return inner;
    }
    if (token === undefined) throw new Error(`${text} ends too soon`);
    return { kind: "letter", name: token };
  }
}

function lettersOf(formula: Modal): string[] {
  switch (formula.kind) {
    case "letter":
      return [formula.name];
    case "false":
      return [];
    case "not":
    case "box":
    case "diamond":
      return lettersOf(formula.body);
    default:
      return [...new Set([...lettersOf(formula.left), ...lettersOf(formula.right)])];
  }
}

/**
 * Whether a formula is true at every point of a frame under every valuation. Sets of points are bit masks.
 * @param successors for each point the set of its successors
 */
export function isValidOn(formula: Modal, successors: readonly number[]): boolean {
  const size = successors.length;
  const everywhere = 2 ** size - 1;
  const letters = lettersOf(formula);
  for (let code = 0; code < 2 ** (size * letters.length); code += 1) {
    const valuation = new Map(
      letters.map((letter, index) => [letter, (code >> (index * size)) & everywhere] as const),
    );
    if (pointsWhere(formula, successors, valuation) !== everywhere) return false;
  }
  return true;
}

function pointsWhere(
  formula: Modal,
  successors: readonly number[],
  valuation: ReadonlyMap<string, number>,
): number {
  const everywhere = 2 ** successors.length - 1;
  const where = (part: Modal) => pointsWhere(part, successors, valuation);
  switch (formula.kind) {
    case "letter":
      return valuation.get(formula.name)!;
    case "false":
      return 0;
    case "not":
      return everywhere & ~where(formula.body);
    case "and":
      return where(formula.left) & where(formula.right);
    case "or":
      return where(formula.left) | where(formula.right);
    case "implies":
      return (everywhere & ~where(formula.left)) | where(formula.right);
    case "box":
    case "diamond": {
      const inner = where(formula.body);
      let points = 0;
      successors.forEach((seen, point) => {
        const holds = formula.kind === "box" ? (seen & ~inner) === 0 : (seen & inner) !== 0;
        if (holds) points |= 1 << point;
      });
      return points;
    }
  }
}
