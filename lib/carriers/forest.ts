import type { ForestDescription } from "../logic/structure-definition.ts";
import { boundOf } from "./gaps.ts";
import { Listed } from "./listed.ts";

/**
 * Elements of a forest that have been named. Its points are the elements in the order of naming; in a rooted one point 0
 * is the root, named or not, and the elements follow.
 */
export interface ForestConfiguration {
  /** How many points. */
  readonly points: number;
  /**
   * For points i, j at `i · points + j` the steps up from i to the nearest common ancestor of both; −1 where that is
   * farther than need be known. The steps down from there to j are those up from j.
   */
  readonly up: readonly number[];
}

export class Forest extends Listed<ForestConfiguration> {
  readonly description: ForestDescription;
  readonly empty: ForestConfiguration;
  /** Points that are not elements: 1 in a rooted forest. */
  readonly #first: 0 | 1;

  constructor(description: ForestDescription) {
    super();
    this.description = description;
    this.#first = description.rooted ? 1 : 0;
    this.empty = description.rooted ? { points: 1, up: [0] } : { points: 0, up: [] };
  }

  protected list(configuration: ForestConfiguration, toCome: number): readonly ForestConfiguration[] {
    const cut = this.#cut(configuration, toCome + 1);
    const { points, up } = cut;
    const { branching } = this.description;
    const near = this.#near(toCome);
    const nearRoot = this.#nearRoot(toCome);
    const extensions = new Map<string, ForestConfiguration>();
    const add = (upFromNew: readonly number[], upToNew: readonly number[]): void => {
      const longer: number[] = [];
      for (let i = 0; i < points; i += 1) longer.push(...up.slice(i * points, (i + 1) * points), upToNew[i]!);
      longer.push(...upFromNew, 0);
      const extended = this.#cut({ points: points + 1, up: longer }, toCome);
      const name = extended.up.join();
      if (!extensions.has(name)) extensions.set(name, extended);
    };
    const far = new Array<number>(points).fill(-1);

    for (let i = 0; i < points; i += 1) {
      // The nodes at or above which point i is, and no point with a smaller number.
      const component: number[] = [];
      for (let j = 0; j < points; j += 1) if (up[i * points + j]! >= 0) component.push(j);
      const highest =
        component[0] === 0 && this.#first === 1
          ? up[i * points]!
          : near + Math.max(...component.map((j) => up[i * points + j]!));
      for (let height = 0; height <= highest; height += 1) {
        if (component.some((j) => j < i && height >= up[i * points + j]!)) break;
        const children = new Set<string>();
        const upFromNode = far.slice();
        const upToNode = far.slice();
        for (const j of component) {
          const upFrom = up[i * points + j]!;
          const upTo = up[j * points + i]!;
          upFromNode[j] = Math.max(0, upFrom - height);
          upToNode[j] = upTo + Math.max(0, height - upFrom);
          if (height >= upFrom && upToNode[j]! > 0)
            children.add(this.#nodeName(cut, component, j, upToNode[j]! - 1));
        }
        for (let deep = 0; deep === 0 || children.size < branching; deep += 1) {
          const steps = (j: number) => deep + upFromNode[j]! + upToNode[j]!;
          if (!component.some((j) => steps(j) <= (j < this.#first ? nearRoot : near))) break;
          add(
            upFromNode.map((steps) => (steps < 0 ? -1 : steps + deep)),
            upToNode,
          );
        }
      }
    }
    add(far, far);
    return [...extensions.values()];
  }

  /** A name of the node so many steps up from a point: the first point that is at or above it, and the steps up from there. */
  #nodeName(
    { points, up }: ForestConfiguration,
    component: readonly number[],
    point: number,
    height: number,
  ): string {
    const first = component.find((j) => height >= up[point * points + j]!)!;
    return `${first},${height - up[point * points + first]! + up[first * points + point]!}`;
  }

  restrict({ points, up }: ForestConfiguration, places: readonly number[]): ForestConfiguration {
    const kept = places.map((place) => place + this.#first);
    if (this.#first === 1) kept.unshift(0);
    return { points: kept.length, up: kept.flatMap((i) => kept.map((j) => up[i * points + j]!)) };
  }

  same({ points, up }: ForestConfiguration, first: number, second: number): boolean {
    const [i, j] = [first + this.#first, second + this.#first];
    return up[i * points + j] === 0 && up[j * points + i] === 0;
  }

  key(configuration: ForestConfiguration, toCome: number): string {
    return this.#cut(configuration, toCome).up.join();
  }

  protected kindName({ points, up }: ForestConfiguration): string {
    const { offset, ends } = this.description;
    const names: string[] = [];
    for (let i = 0; i < points; i += 1)
      for (let j = i + 1; j < points; j += 1) {
        const [from, to] = [up[i * points + j]!, up[j * points + i]!];
        const known = from >= 0 && from + to <= (i < this.#first ? ends - 1 : offset);
        names.push(known ? `${from},${to}` : "");
      }
    return names.join(";");
  }

  mostExtensions(named: number, toCome: number): number {
    const near = this.#near(toCome);
    const nearRoot = this.#nearRoot(toCome);
    if (named === 0) return boundOf(nearRoot + 2);
    const corner = (steps: number) => ((steps + 1) * (steps + 2)) / 2;
    return boundOf(1 + named * named * corner(near) + named * corner(nearRoot));
  }

  /** T(toCome). */
  #near(toCome: number): number {
    return this.description.offset * 2 ** toCome;
  }

  /** S(toCome). */
  #nearRoot(toCome: number): number {
    return this.description.rooted
      ? this.description.ends - 1 + this.description.offset * (2 ** toCome - 1)
      : -1;
  }

  #cut(configuration: ForestConfiguration, toCome: number): ForestConfiguration {
    const { points, up } = configuration;
    const near = this.#near(toCome);
    const nearRoot = this.#nearRoot(toCome);
    const component = Array.from({ length: points }, (_, i) => i);
    for (let i = 0; i < points; i += 1)
      for (let j = i + 1; j < points; j += 1) {
        const from = up[i * points + j]!;
        if (from < 0 || from + up[j * points + i]! > (i < this.#first ? nearRoot : near)) continue;
        const [kept, gone] = [component[i]!, component[j]!];
        if (kept !== gone) for (let m = 0; m < points; m += 1) if (component[m] === gone) component[m] = kept;
      }
    let changed = false;
    const cut = up.map((steps, at) => {
      if (steps < 0 || component[Math.floor(at / points)] === component[at % points]) return steps;
      changed = true;
      return -1;
    });
    return changed ? { points, up: cut } : configuration;
  }
}
