/** Truth by definition: nested loops over points, with none of the program's own machinery. */
import type { Formula, RelationSymbol } from "../../lib/logic/formula.ts";

/** For each relation, the tuples (points from 0, joined by commas) at which it holds. */
export type Interpretation = ReadonlyMap<string, ReadonlySet<string>>;

export function isTrue(
  formula: Formula,
  size: number,
  relations: Interpretation,
  values: Readonly<Record<string, number>> = {},
): boolean {
  switch (formula.kind) {
    case "true":
      return true;
    case "false":
      return false;
    case "atom":
      return relations.get(formula.relation.name)!.has(formula.args.map((v) => values[v]).join());
    case "equal":
      return values[formula.left] === values[formula.right];
    case "not":
      return !isTrue(formula.body, size, relations, values);
    case "and":
      for (const part of formula.parts) if (!isTrue(part, size, relations, values)) return false;
      return true;
    case "or":
      for (const part of formula.parts) if (isTrue(part, size, relations, values)) return true;
      return false;
    case "implies":
      return isTrue(formula.left, size, relations, values)
        ? isTrue(formula.right, size, relations, values)
        : true;
    case "iff":
      return (
        Number(isTrue(formula.left, size, relations, values)) ===
        Number(isTrue(formula.right, size, relations, values))
      );
    case "forall":
      for (let point = 0; point < size; point += 1)
        if (!isTrue(formula.body, size, relations, { ...values, [formula.variable]: point })) return false;
      return true;
    case "exists":
      for (let point = 0; point < size; point += 1)
        if (isTrue(formula.body, size, relations, { ...values, [formula.variable]: point })) return true;
      return false;
  }
}

/** All tuples of points from 0, in lexicographic order. */
export function allTuples(size: number, places: number): string[] {
  let tuples: number[][] = [[]];
  for (let place = 0; place < places; place += 1)
    tuples = tuples.flatMap((tuple) => Array.from({ length: size }, (_, point) => [...tuple, point]));
  return tuples.map((tuple) => tuple.join());
}

/** All interpretations of the relations on `size` points. */
export function* allInterpretations(
  size: number,
  relations: readonly RelationSymbol[],
): Generator<Interpretation> {
  const cells = relations.flatMap((relation) =>
    allTuples(size, relation.places).map((tuple) => [relation.name, tuple] as const),
  );
  if (cells.length > 24) throw new Error(`2^${cells.length} interpretations are too many`);
  for (let code = 0; code < 2 ** cells.length; code += 1) {
    const tables = new Map<string, Set<string>>(relations.map((relation) => [relation.name, new Set()]));
    cells.forEach(([name, tuple], bit) => {
      if ((code >> bit) & 1) tables.get(name)!.add(tuple);
    });
    yield tables;
  }
}
