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
  if (!isTransitive(relation)) return null;
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

export function isReflexive(relation: Matrix): boolean {
  return relation.every((row, i) => row[i]!);
}

export function isTransitive(relation: Matrix): boolean {
  return relation.every((row, i) =>
    row.every((holds, j) => !holds || relation[j]!.every((next, k) => !next || relation[i]![k]!)),
  );
}

/** Whether every point is related to at most one, itself included. */
export function isFunctional(relation: Matrix): boolean {
  return relation.every((row) => row.filter(Boolean).length <= 1);
}

export function converseOf(relation: Matrix): Matrix {
  return relation.map((_, i) => relation.map((row) => row[i]!));
}

/**
 * The classes of points that a preorder puts on one level both ways, counted from 0, each in order and by least
 * point, and the order between the classes, reflexive.
 */
export function classesOf(preorder: Matrix): {
  readonly classes: readonly (readonly number[])[];
  readonly order: Matrix;
} {
  const classes: number[][] = [];
  preorder.forEach((row, i) => {
    const known = classes.find(([first]) => row[first!] && preorder[first!]![i]);
    if (known === undefined) classes.push([i]);
    else known.push(i);
  });
  const order = classes.map(([i]) => classes.map(([j]) => preorder[i!]![j!]!));
  return { classes, order };
}

/**
 * The differences y − x modulo the number of points on which the relation depends alone, in order; null when it
 * depends on more.
 */
export function differencesOf(relation: Matrix): readonly number[] | null {
  const size = relation.length;
  const first = relation[0]!;
  const depends = relation.every((row, x) => row.every((holds, y) => holds === first[(y - x + size) % size]));
  return depends ? first.flatMap((holds, difference) => (holds ? [difference] : [])) : null;
}
