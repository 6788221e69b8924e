/** What infinite carriers share: kinds numbered by listing, and memories that keep listing fast. */
import type { CarrierDescription } from "../logic/structure-definition.ts";
import type { Carrier, Symmetry } from "./carrier.ts";

/** Configurations that are remembered with their extensions before all are forgotten. */
const MOST_REMEMBERED = 100_000;

/**
 * A carrier whose kinds are numbered in the order in which listing meets them: first those of the first extension of
 * the empty configuration, extended in turn, and so on. By the law of extensions every tuple has the kind of a listed
 * one, so that all kinds have numbers.
 *
 * What is remembered never changes a result.
 */
export abstract class Listed<Configuration extends object> implements Carrier<Configuration> {
  abstract readonly description: CarrierDescription;
  readonly size: number | null = null;
  abstract readonly empty: Configuration;
  /** By length: the number of each kind, by its name. */
  readonly #numbers: ReadonlyMap<string, number>[] = [];
  /** By how many quantifiers are still to come: extensions by the key of what they extend. */
  readonly #extensions: Map<string, readonly Configuration[]>[] = [];
  #remembered = 0;
  /** Where a configuration remembers the kinds of its tuples, by their places. Weak maps of so many would be slow. */
  readonly #kinds = Symbol("kinds");

  /** What {@link extensions} lists, without a configuration twice. */
  protected abstract list(configuration: Configuration, toCome: number): readonly Configuration[];
  /** A name of the kind of the tuple of all elements of a configuration; the same for the same kind, and for no other. */
  protected abstract kindName(configuration: Configuration): string;
  abstract restrict(configuration: Configuration, places: readonly number[]): Configuration;
  abstract same(configuration: Configuration, first: number, second: number): boolean;
  abstract key(configuration: Configuration, toCome: number): string;
  abstract mostExtensions(named: number, toCome: number): number;

  extensions(configuration: Configuration, toCome: number): readonly Configuration[] {
    this.#extensions[toCome] ??= new Map();
    const key = this.key(configuration, toCome + 1);
    const known = this.#extensions[toCome].get(key);
    if (known !== undefined) return known;
    const listed = this.list(configuration, toCome);
    this.#remembered += listed.length;
    if (this.#remembered > MOST_REMEMBERED) {
      for (const extensions of this.#extensions) extensions?.clear();
      this.#remembered = listed.length;
    }
    this.#extensions[toCome].set(key, listed);
    return listed;
  }

  kindCount(length: number): number {
    return this.#kindsOf(length).size;
  }

  kindOf(configuration: Configuration, places: readonly number[]): number {
    const memory = configuration as { [kinds: symbol]: Map<number | string, number> | undefined };
    let kinds = memory[this.#kinds];
    if (kinds === undefined) {
      kinds = new Map();
      memory[this.#kinds] = kinds;
    }
    const place = places.length === 2 ? places[0]! * 4096 + places[1]! : places.join();
    let kind = kinds.get(place);
    if (kind === undefined) {
      kind = this.findKind(configuration, places);
      kinds.set(place, kind);
    }
    return kind;
  }

  /** What {@link kindOf} remembers. A carrier that overrides it numbers kinds its own way, in the other two as well. */
  protected findKind(configuration: Configuration, places: readonly number[]): number {
    const kind = this.#kindsOf(places.length).get(this.kindName(this.restrict(configuration, places)));
    if (kind === undefined) throw new Error(`a kind that listing does not meet: ${this.description.kind}`);
    return kind;
  }

  /** A configuration of each kind, in the order of their numbers. */
  kindExamples(length: number): readonly Configuration[] {
    const examples: Configuration[] = [];
    const seen = new Set<string>();
    const extended = Array.from({ length }, () => new Set<string>());
    const extend = (configuration: Configuration, left: number): void => {
      if (left > 0) {
        // The extensions of another with the same key are of the same kinds.
        const key = this.key(configuration, left);
        const known = extended[left - 1]!;
        if (known.has(key)) return;
        known.add(key);
        for (const next of this.extensions(configuration, left - 1)) extend(next, left - 1);
      } else {
        const name = this.kindName(configuration);
        if (!seen.has(name)) examples.push(configuration);
        seen.add(name);
      }
    };
    extend(this.empty, length);
    return examples;
  }

  symmetries(): readonly Symmetry[] {
    return [];
  }

  #kindsOf(length: number): ReadonlyMap<string, number> {
    this.#numbers[length] ??= new Map(
      this.kindExamples(length).map((configuration, number) => [this.kindName(configuration), number]),
    );
    return this.#numbers[length];
  }
}
