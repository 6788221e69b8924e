import type { PointsDescription } from "../logic/structure-definition.ts";
import type { Carrier, Symmetry } from "./carrier.ts";
import { Points } from "./points.ts";
import type { Structure, Table } from "./structure.ts";

/** A permutation of the points 0, …, n − 1: where each of them goes. */
export type Permutation = readonly number[];

/** Members that a group may have; each is kept, since they are gone through to name a configuration. */
export const LARGEST_GROUP = 4_000;

/**
 * Points that have been named, as the least of all lists to which the group takes them, in lexicographic order; and
 * the members of the group that leave all of them where they are.
 */
export interface OrbitsConfiguration {
  readonly points: readonly number[];
  readonly stabiliser: readonly Permutation[];
}

/**
 * The finite domain of n points with a group of permutations, given by generators: kinds of tuples are the orbits of
 * the group, so that a table is a relation that every member of the group preserves. With the rotations of n points,
 * for instance, whether a two-place relation holds of (x, y) depends on y − x modulo n alone. It is for finding
 * structures with much symmetry; {@link plainStructure} makes ordinary structures on points of them.
 *
 * Why the extensions suffice: let all tables be preserved by the group. Then so is every formula: for a member g, it
 * holds of a list of points exactly if it holds of their images under g (by induction; a quantifier ranges over all
 * points before as after, as g permutes them). So a configuration may be replaced by any image of it, and we take the
 * least one. After c, the points x and g(x), for a member g that leaves every point of c where it is, extend c to lists
 * of which one is the image of the other, so that one of them is enough: we take the least point of each orbit of the
 * stabiliser of c. The list of c and such a point is again the least of its images, since an image of it that is not
 * greater must begin with c, and so comes of a member of the stabiliser.
 */
export class Orbits implements Carrier<OrbitsConfiguration> {
  /** The domain. The group is a matter of the search: what is found is written down as a structure on points. */
  readonly description: PointsDescription;
  readonly size: number;
  readonly empty: OrbitsConfiguration;
  readonly #group: readonly Permutation[];
  readonly #generators: readonly Permutation[];
  /** By length of tuples, for each tuple, read as a number in base n, the number of its orbit. */
  readonly #orbits = new Map<number, Orbit>();

  /** @throws RangeError when a generator is no permutation or the group has more than {@link LARGEST_GROUP} members */
  constructor(size: number, generators: readonly Permutation[]) {
    this.size = size;
    this.description = { kind: "points", size };
    this.#generators = generators;
    this.#group = groupOf(size, generators);
    this.empty = { points: [], stabiliser: this.#group };
  }

  /** How many members the group has. */
  get groupOrder(): number {
    return this.#group.length;
  }

  extensions(configuration: OrbitsConfiguration): readonly OrbitsConfiguration[] {
    const { points, stabiliser } = configuration;
    const extended: OrbitsConfiguration[] = [];
    for (let point = 0; point < this.size; point += 1) {
      if (stabiliser.length > 1 && stabiliser.some((member) => member[point]! < point)) continue;
      extended.push({ points: [...points, point], stabiliser: leavingAlone(stabiliser, point) });
    }
    return extended;
  }

  restrict(configuration: OrbitsConfiguration, places: readonly number[]): OrbitsConfiguration {
    let points: number[] = [];
    // The members that take the points chosen so far to the least list.
    let members = this.#group;
    for (const place of places) {
      const point = configuration.points[place]!;
      let least = this.size;
      for (const member of members) if (member[point]! < least) least = member[point]!;
      if (members.length > 1) members = members.filter((member) => member[point] === least);
      points = [...points, least];
    }
    let stabiliser = this.#group;
    for (const point of points) stabiliser = leavingAlone(stabiliser, point);
    return { points, stabiliser };
  }

  same(configuration: OrbitsConfiguration, first: number, second: number): boolean {
    return configuration.points[first] === configuration.points[second];
  }

  kindCount(length: number): number {
    return this.#orbitsOf(length).count;
  }

  kindOf(configuration: OrbitsConfiguration, places: readonly number[]): number {
    let tuple = 0;
    for (const place of places) tuple = tuple * this.size + configuration.points[place]!;
    return this.#orbitsOf(places.length).numbers[tuple]!;
  }

  key(configuration: OrbitsConfiguration): string | number {
    let key = 0;
    for (const point of configuration.points) key = key * this.size + point;
    return key <= Number.MAX_SAFE_INTEGER ? key : configuration.points.join();
  }

  mostExtensions(): number {
    return this.size;
  }

  /** None are listed: what the group leaves is searched quickly as it is. */
  symmetries(): readonly Symmetry[] {
    return [];
  }

  /** The table over all tuples of points that a table over orbits stands for. */
  plainTable({ relation, holds }: Table): Table {
    const { numbers } = this.#orbitsOf(relation.places);
    return { relation, holds: Uint8Array.from(numbers, (number) => holds[number]!) };
  }

  /** Numbers the orbits of tuples in the order of their least tuples. */
  #orbitsOf(length: number): Orbit {
    const known = this.#orbits.get(length);
    if (known !== undefined) return known;
    const { size } = this;
    const numbers = new Int32Array(size ** length).fill(-1);
    let count = 0;
    for (let first = 0; first < numbers.length; first += 1) {
      if (numbers[first]! >= 0) continue;
      numbers[first] = count;
      for (const waiting = [first]; waiting.length > 0; ) {
        const tuple = waiting.pop()!;
        for (const generator of this.#generators) {
          let image = 0;
          for (let place = 0, rest = tuple, weight = 1; place < length; place += 1, weight *= size) {
            image += generator[rest % size]! * weight;
            rest = Math.floor(rest / size);
          }
          if (numbers[image]! >= 0) continue;
          numbers[image] = count;
          waiting.push(image);
        }
      }
      count += 1;
    }
    const orbits = { numbers, count };
    this.#orbits.set(length, orbits);
    return orbits;
  }
}

interface Orbit {
  readonly numbers: Int32Array;
  readonly count: number;
}

/** The structure on points that a structure on {@link Orbits} stands for. */
export function plainStructure(structure: Structure): Structure {
  const { carrier } = structure;
  if (!(carrier instanceof Orbits)) throw new TypeError("a structure on orbits of a group is expected");
  const tables = new Map<string, Table>();
  for (const [name, table] of structure.tables) tables.set(name, carrier.plainTable(table));
  return { carrier: new Points(carrier.size), tables };
}

function leavingAlone(members: readonly Permutation[], point: number): readonly Permutation[] {
  return members.length === 1 ? members : members.filter((member) => member[point] === point);
}

/** All products of the generators, the identity first. */
function groupOf(size: number, generators: readonly Permutation[]): readonly Permutation[] {
  for (const generator of generators)
    if (generator.length !== size || [...generator].sort((a, b) => a - b).some((point, at) => point !== at))
      throw new RangeError(`no permutation of ${size} points: ${generator.join()}`);
  const members: Permutation[] = [Array.from({ length: size }, (_, point) => point)];
  const seen = new Set([members[0]!.join()]);
  for (let next = 0; next < members.length; next += 1)
    for (const generator of generators) {
      const product = members[next]!.map((point) => generator[point]!);
      const name = product.join();
      if (seen.has(name)) continue;
      if (members.length === LARGEST_GROUP)
        throw new RangeError(`a group of more than ${LARGEST_GROUP} members`);
      seen.add(name);
      members.push(product);
    }
  return members;
}
