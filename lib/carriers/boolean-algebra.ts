import type { BooleanAlgebraDescription } from "../logic/structure-definition.ts";
import { Listed } from "./listed.ts";

export interface BooleanConfiguration {
  readonly named: number;
  /**
   * The cells that are not empty, ascending. The cell m is what lies in the elements at the places i with bit i of m
   * set, and outside of all others; so 0 is what lies outside of all of them.
   */
  readonly cells: readonly number[];
}

/** The countable atomless Boolean algebra, with its zero and its top or without. */
export class BooleanAlgebra extends Listed<BooleanConfiguration> {
  readonly description: BooleanAlgebraDescription;
  readonly empty: BooleanConfiguration = { named: 0, cells: [0] };

  constructor(description: BooleanAlgebraDescription) {
    super();
    if (description.zero && !description.top)
      throw new RangeError("a Boolean algebra with its zero and without its top");
    this.description = description;
  }

  protected list({ named, cells }: BooleanConfiguration): readonly BooleanConfiguration[] {
    const { zero, top } = this.description;
    const extended: BooleanConfiguration[] = [];
    const bit = 2 ** named;
    const choose = (place: number, outside: readonly number[], inside: readonly number[]): void => {
      if (place === cells.length) {
        if (zero || inside.length > 0)
          extended.push({ named: named + 1, cells: [...outside, ...inside.map((cell) => cell + bit)] });
        return;
      }
      const cell = cells[place]!;
      choose(place + 1, [...outside, cell], inside);
      if (top || cell !== 0) choose(place + 1, outside, [...inside, cell]);
      choose(place + 1, [...outside, cell], [...inside, cell]);
    };
    choose(0, [], []);
    return extended;
  }

  restrict({ cells }: BooleanConfiguration, places: readonly number[]): BooleanConfiguration {
    const restricted = new Set<number>();
    for (const cell of cells) {
      let smaller = 0;
      for (let place = 0; place < places.length; place += 1)
        if ((cell >>> places[place]!) & 1) smaller += 2 ** place;
      restricted.add(smaller);
    }
    return { named: places.length, cells: [...restricted].sort((a, b) => a - b) };
  }

  same({ cells }: BooleanConfiguration, first: number, second: number): boolean {
    return cells.every((cell) => ((cell >>> first) & 1) === ((cell >>> second) & 1));
  }

  protected kindName({ cells }: BooleanConfiguration): string {
    return cells.join();
  }

  key({ named, cells }: BooleanConfiguration): string {
    return `${named}:${cells.join()}`;
  }

  mostExtensions(named: number): number {
    const most = 3 ** (2 ** named);
    return most <= Number.MAX_SAFE_INTEGER ? most : Number.POSITIVE_INFINITY;
  }
}
