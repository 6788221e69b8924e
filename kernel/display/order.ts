/** What a finite two-place relation looks like: which kind of order it is, and which of its pairs a picture needs. */

/** A two-place relation on points counted from 0: `holds[i][j]`. */
export type Matrix = readonly (readonly boolean[])[];

export function matrixOf(size: number, pairs: readonly (readonly number[])[]): Matrix {
  const rows = Array.from({ length: size }, () => new Array<boolean>(size).fill(false));
  for (const [first, second] of pairs) rows[first! - 1]![second! - 1] = true;
  return rows;
}

export function isSymmetric(relation: Matrix): boolean {
  return relation.every((row, i) => row.every((holds, j) => holds === relation[j]![i]!));
}

/** `strict-order`: irreflexive and transitive; `partial-order`: reflexive, antisymmetric and transitive. */
export type OrderKind = "strict-order" | "partial-order";

/** Which kind of order it is, checked pair by pair; null when it is neither. */
export function orderKind(relation: Matrix): OrderKind | null {
  const loops = relation.filter((row, i) => row[i]).length;
  if (loops !== 0 && loops !== relation.length) return null;
  const transitive = relation.every((row, i) =>
    row.every((holds, j) => !holds || relation[j]!.every((next, k) => !next || relation[i]![k]!)),
  );
  if (!transitive) return null;
  const antisymmetric = relation.every((row, i) =>
    row.every((holds, j) => i === j || !holds || !relation[j]![i]),
  );
  if (!antisymmetric) return null;
  return loops === 0 ? "strict-order" : "partial-order";
}

/**
 * The covering pairs of an order, counted from 0: those i, j with nothing in between. They are the transitive
 * reduction, and the order is read off them by going upwards.
 */
export function coveringPairs(order: Matrix): readonly (readonly [number, number])[] {
  const pairs: [number, number][] = [];
  order.forEach((row, i) => {
    row.forEach((holds, j) => {
      if (!holds || i === j) return;
      const between = order.some((next, k) => k !== i && k !== j && row[k]! && next[j]!);
      if (!between) pairs.push([i, j]);
    });
  });
  return pairs;
}

/** Whether no arcs but loops lead back to where they began. */
export function isAcyclic(relation: Matrix): boolean {
  const waiting = relation.map((_, j) => relation.filter((row, i) => i !== j && row[j]).length);
  const ready = waiting.flatMap((count, j) => (count === 0 ? [j] : []));
  let removed = 0;
  for (let next = ready.pop(); next !== undefined; next = ready.pop()) {
    removed += 1;
    relation[next]!.forEach((holds, j) => {
      if (!holds || j === next) return;
      waiting[j]! -= 1;
      if (waiting[j] === 0) ready.push(j);
    });
  }
  return removed === relation.length;
}
