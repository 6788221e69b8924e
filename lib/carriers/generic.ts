import type { GenericDescription } from "../logic/structure-definition.ts";
import type { Symmetry } from "./carrier.ts";
import { KindSymmetry } from "./kind-symmetry.ts";
import { Listed } from "./listed.ts";

/**
 * How an element stands to another: there is no arc between them, one from the first to the second, one back, both
 * (in a graph, an edge); or they are the same. In a partial order an arc leads from the lesser to the greater.
 */
export const NONE = 0;
export const FORTH = 1;
export const BACK = 2;
export const BOTH = 3;
export const EQUAL = 4;
/** From how a stands to b to how b stands to a. */
const REVERSED = [NONE, BACK, FORTH, BOTH, EQUAL];

/** How an element can stand to another one that is different from it. */
const CODES = {
  graph: [NONE, BOTH],
  digraph: [NONE, FORTH, BACK, BOTH],
  tournament: [FORTH, BACK],
  "partial-order": [NONE, FORTH, BACK],
} as const;

/** Exchanges of codes that make a generic structure of a generic structure, by the code that each code becomes. */
const EXCHANGES = {
  graph: [[BOTH, FORTH, BACK, NONE, EQUAL]],
  digraph: [REVERSED, [BOTH, FORTH, BACK, NONE, EQUAL], [BOTH, BACK, FORTH, NONE, EQUAL]],
  tournament: [REVERSED],
  "partial-order": [REVERSED],
} as const;

export interface GenericConfiguration {
  readonly named: number;
  /** How the element at place i stands to that at place j, for i < j, is at j(j − 1)/2 + i. */
  readonly codes: readonly number[];
  /** The codes as digits. */
  readonly name: string;
}

/**
 * The generic graph (Rado 1964), digraph, tournament and partial order (Schmerl 1979): the countable structures in
 * which every finite member of the class can be found, and in which the elements of every finite part A extend to a
 * part B whenever B is a member of the class with one element more. There is one such structure up to isomorphism for
 * each of the classes (Fraïssé 1954), since two members with a common part A can be put together over A: in a graph and
 * a digraph without further edges, in a tournament with any further arcs, in a partial order with what transitivity
 * demands. That is a partial order again: a chain from one side to the other passes through A, so that it could only
 * close to a circle if there had been one on one side. Graphs and digraphs have no loops; between two elements of the
 * digraph there may be no arc, one, or two that are opposite.
 *
 * Why the extensions suffice: let two tuples x and y have the same configuration. Then the map from x to y is an
 * isomorphism of finite parts. Let a be any element. If it is one of x, let b be the same one of y. Otherwise x with a
 * is a member of the class with one element more than x, so it extends y too, by some b. Either way x, a and y, b have
 * the same configuration, and it is listed: by an element that is named already, or by how a stands to each of
 * them. So tuples with the same configuration can be extended to such for ever, in both directions, and satisfy the same
 * formulas (Fraïssé 1954). And nothing else is listed: every choice of how a new element stands to the others makes a
 * member of the class, in a partial order if any two of them and the new one are in a partial order; so it is there.
 *
 * It does not matter how many quantifiers are still to come.
 */
export class Generic extends Listed<GenericConfiguration> {
  readonly description: GenericDescription;
  readonly empty: GenericConfiguration = { named: 0, codes: [], name: "" };
  /** For each code, the kind of the pairs that have it; made when first asked for. */
  #pairKinds: readonly number[] | null = null;

  constructor(description: GenericDescription) {
    super();
    this.description = description;
  }

  protected list(configuration: GenericConfiguration): readonly GenericConfiguration[] {
    const { named, codes, name } = configuration;
    const { of } = this.description;
    const extended: GenericConfiguration[] = [];
    const add = (row: readonly number[]): void => {
      extended.push({ named: named + 1, codes: [...codes, ...row], name: name + row.join("") });
    };
    /** For each place the first one with the same element. */
    const firsts: number[] = [];
    for (let place = 0; place < named; place += 1) {
      const row: number[] = [];
      for (let other = 0; other < named; other += 1) row.push(between(configuration, other, place));
      firsts.push(row.indexOf(EQUAL));
      if (firsts[place] === place) add(row);
    }
    const row: number[] = [];
    const choose = (): void => {
      const place = row.length;
      if (place === named) {
        add(row);
        return;
      }
      const first = firsts[place]!;
      for (const code of first < place ? [row[first]!] : CODES[of]) {
        if (of === "partial-order" && !isTransitive(configuration, row, code)) continue;
        row.push(code);
        choose();
        row.pop();
      }
    };
    choose();
    return extended;
  }

  restrict(configuration: GenericConfiguration, places: readonly number[]): GenericConfiguration {
    const codes: number[] = [];
    for (let second = 1; second < places.length; second += 1)
      for (let first = 0; first < second; first += 1)
        codes.push(between(configuration, places[first]!, places[second]!));
    return { named: places.length, codes, name: codes.join("") };
  }

  same(configuration: GenericConfiguration, first: number, second: number): boolean {
    return between(configuration, first, second) === EQUAL;
  }

  override kindOf(configuration: GenericConfiguration, places: readonly number[]): number {
    if (places.length !== 2) return super.kindOf(configuration, places);
    this.#pairKinds ??= this.#listPairKinds();
    return this.#pairKinds[between(configuration, places[0]!, places[1]!)]!;
  }

  protected kindName({ name }: GenericConfiguration): string {
    return name;
  }

  key({ named, name }: GenericConfiguration): string {
    // Only these two have as many codes: none.
    return named === 0 ? "-" : name;
  }

  mostExtensions(named: number): number {
    return named + CODES[this.description.of].length ** named;
  }

  /**
   * Reversing all arcs of a generic structure makes a generic one of the same class, and so does the complement of a graph
   * or digraph. As there is one up to isomorphism, a permutation of the elements does the same.
   */
  override symmetries(): readonly Symmetry[] {
    return EXCHANGES[this.description.of].map(
      (exchange) =>
        new KindSymmetry(this, ({ named, codes }) => {
          const changed = codes.map((code) => exchange[code]!);
          return { named, codes: changed, name: changed.join("") };
        }),
    );
  }

  #listPairKinds(): readonly number[] {
    const kinds: number[] = [];
    for (const [kind, { codes }] of this.kindExamples(2).entries()) kinds[codes[0]!] = kind;
    return kinds;
  }
}

/** How the element at one place stands to the element at another. */
export function between({ codes }: GenericConfiguration, first: number, second: number): number {
  if (first === second) return EQUAL;
  if (first < second) return codes[(second * (second - 1)) / 2 + first]!;
  return REVERSED[codes[(first * (first - 1)) / 2 + second]!]!;
}

/**
 * Whether, in a partial order, the next element can stand to a new one as the code says, when those before stand to it as
 * the row says: whether each of them, the next and the new one are in a transitive order. The same elements have the same
 * codes.
 */
function isTransitive(configuration: GenericConfiguration, row: readonly number[], code: number): boolean {
  const place = row.length;
  for (let other = 0; other < place; other += 1) {
    const before = row[other]!;
    switch (between(configuration, other, place)) {
      case FORTH:
        if ((code === FORTH && before !== FORTH) || (before === BACK && code !== BACK)) return false;
        break;
      case BACK:
        if ((before === FORTH && code !== FORTH) || (code === BACK && before !== BACK)) return false;
        break;
      case NONE:
        if ((before === FORTH && code === BACK) || (before === BACK && code === FORTH)) return false;
        break;
    }
  }
  return true;
}
