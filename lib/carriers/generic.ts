import type { GenericDescription } from "../logic/structure-definition.ts";
import { Listed } from "./listed.ts";

/** How two named elements stand to each other: an arc forth, back, both (an edge, in a graph), none; or they are one. */
const NONE = 0;
const FORTH = 1;
const BACK = 2;
const BOTH = 3;
const EQUAL = 4;

/** How a new element may stand to another one, which it is not: to that element from the new one. */
const RELATIONS = {
  graph: [NONE, BOTH],
  digraph: [NONE, FORTH, BACK, BOTH],
  tournament: [FORTH, BACK],
  "partial-order": [NONE, FORTH, BACK],
} as const;

export interface GenericConfiguration {
  readonly named: number;
  /**
   * How the elements at places i < j stand to each other, at j(j − 1)/2 + i: `FORTH` when there is an arc from that
   * at i to that at j, and so on. In a partial order an arc leads from the lesser to the greater.
   */
  readonly codes: readonly number[];
}

/** The generic graph, digraph, tournament or partial order. */
export class Generic extends Listed<GenericConfiguration> {
  readonly description: GenericDescription;
  readonly empty: GenericConfiguration = { named: 0, codes: [] };

  constructor(description: GenericDescription) {
    super();
    this.description = description;
  }

  protected list({ named, codes }: GenericConfiguration): readonly GenericConfiguration[] {
    const extended: GenericConfiguration[] = [];
    const add = (row: readonly number[]) => extended.push({ named: named + 1, codes: [...codes, ...row] });
    const rowOf = (place: number) =>
      Array.from({ length: named }, (_, other) => between(codes, other, place));
    const isFirst = Array.from({ length: named }, (_, place) => rowOf(place).indexOf(EQUAL) === place);
    for (let place = 0; place < named; place += 1) if (isFirst[place]) add(rowOf(place));
    const relations = RELATIONS[this.description.of];
    const choose = (row: readonly number[]): void => {
      const place = row.length;
      if (place === named) return void add(row);
      const twin = rowOf(place).indexOf(EQUAL);
      for (const code of twin < place ? [row[twin]!] : relations)
        if (this.description.of !== "partial-order" || isTransitive(codes, row, code)) choose([...row, code]);
    };
    choose([]);
    return extended;
  }

  restrict({ codes }: GenericConfiguration, places: readonly number[]): GenericConfiguration {
    const restricted: number[] = [];
    for (let second = 1; second < places.length; second += 1)
      for (let first = 0; first < second; first += 1)
        restricted.push(between(codes, places[first]!, places[second]!));
    return { named: places.length, codes: restricted };
  }

  same({ codes }: GenericConfiguration, first: number, second: number): boolean {
    return between(codes, first, second) === EQUAL;
  }

  protected kindName({ codes }: GenericConfiguration): string {
    return codes.join("");
  }

  key({ named, codes }: GenericConfiguration): string {
    return `${named}:${codes.join("")}`;
  }

  mostExtensions(named: number): number {
    return named + RELATIONS[this.description.of].length ** named;
  }
}

/** How the element at one place stands to the element at another. */
function between(codes: readonly number[], first: number, second: number): number {
  if (first === second) return EQUAL;
  if (first < second) return codes[(second * (second - 1)) / 2 + first]!;
  return reversed(codes[(first * (first - 1)) / 2 + second]!);
}

function reversed(code: number): number {
  return code === FORTH ? BACK : code === BACK ? FORTH : code;
}

/** Whether a new element that stands to the first elements as the row says may stand to the next one as the code says. */
function isTransitive(codes: readonly number[], row: readonly number[], code: number): boolean {
  const place = row.length;
  return row.every((other, at) => {
    const known = between(codes, at, place);
    if (known === FORTH) return (code !== FORTH || other === FORTH) && (other !== BACK || code === BACK);
    if (known === BACK) return (other !== FORTH || code === FORTH) && (code !== BACK || other === BACK);
    if (known === EQUAL) return code === other;
    return !(other === FORTH && code === BACK) && !(other === BACK && code === FORTH);
  });
}
