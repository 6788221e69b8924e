import type { DenseLineDescription } from "../logic/structure-definition.ts";
import { Listed } from "./listed.ts";

/** Rational numbers that have been named, in the order of naming. */
export interface DenseConfiguration {
  /** For each element, how many different numbers named are less than it. */
  readonly ranks: readonly number[];
  /** For each element its colour, from 0. Elements of the same rank have the same. */
  readonly colours: readonly number[];
}

/**
 * The rational numbers in their order, each in one of some colours, so that between any two numbers there are numbers of
 * every colour. A kind is the order of the elements and their colours.
 *
 * Why the extensions suffice: the line is homogeneous (Cantor 1895; with colours Skolem 1920). Let two configurations
 * have the same order and colours, with the same repeats. For every a there is an a′ so that the configurations with a
 * and a′ are again so: if a is named take that one; otherwise a lies in one of the gaps, before the first element, between
 * two neighbours or after the last, and the same gap of the other configuration has a number of the same colour, since
 * every interval has. By induction on formulas both satisfy the same ones, whatever their depth; so it is enough to
 * list one extension for each element named, and for each gap and colour. No two of these have the same order and colours.
 */
export class DenseLine extends Listed<DenseConfiguration> {
  readonly description: DenseLineDescription;
  readonly empty: DenseConfiguration = { ranks: [], colours: [] };

  constructor(description: DenseLineDescription) {
    super();
    this.description = description;
  }

  protected list({ ranks, colours }: DenseConfiguration): readonly DenseConfiguration[] {
    const extensions: DenseConfiguration[] = [];
    const distinct = ranks.length === 0 ? 0 : Math.max(...ranks) + 1;
    for (let gap = 0; gap <= distinct; gap += 1) {
      const moved = ranks.map((rank) => (rank < gap ? rank : rank + 1));
      for (let colour = 0; colour < this.description.colours; colour += 1)
        extensions.push({ ranks: [...moved, gap], colours: [...colours, colour] });
      if (gap < distinct)
        extensions.push({ ranks: [...ranks, gap], colours: [...colours, colours[ranks.indexOf(gap)]!] });
    }
    return extensions;
  }

  restrict({ ranks, colours }: DenseConfiguration, places: readonly number[]): DenseConfiguration {
    const kept = places.map((place) => ranks[place]!);
    const distinct = [...new Set(kept)].sort((a, b) => a - b);
    return {
      ranks: kept.map((rank) => distinct.indexOf(rank)),
      colours: places.map((place) => colours[place]!),
    };
  }

  same({ ranks }: DenseConfiguration, first: number, second: number): boolean {
    return ranks[first] === ranks[second];
  }

  key({ ranks, colours }: DenseConfiguration): string {
    return this.description.colours === 1 ? ranks.join() : `${ranks.join()};${colours.join()}`;
  }

  protected kindName(configuration: DenseConfiguration): string {
    return this.key(configuration);
  }

  mostExtensions(named: number): number {
    return (named + 1) * this.description.colours + named;
  }
}
