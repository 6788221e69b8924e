/**
 * Carriers: domains, finite or infinite, whose configurations can be listed.
 *
 * A configuration is finitely many elements that have been named one after another, known only up to what can be
 * told apart with the quantifiers still to come. A carrier lists the finitely many ways to name one more, and
 * says of which kind (orbit) a tuple of named elements is. A structure is a carrier and, for every relation, the
 * set of kinds at which it holds. So a sentence unfolds to a finite propositional formula over an unknown table,
 * with ∀ as a conjunction and ∃ as a disjunction over the extensions; a SAT solver finds the table, and the same
 * code finds finite and infinite models.
 */
import type { CarrierDescription } from "../logic/structure-definition.ts";

/**
 * What a carrier must answer. Configurations are immutable and opaque to callers.
 *
 * Laws, for every configuration c:
 * - for every depth, the sentences of that depth that hold in a structure on this carrier are those that come out
 *   true when quantifiers range over `extensions`; each carrier proves this in its file, with its source;
 * - `extensions(c, r)` is never empty, and lists the same configurations in the same order at every call;
 * - `kindOf(restrict(c, p), [0, 1, …])` is `kindOf(c, p)`;
 * - configurations with the same `key` for some quantifiers to come have the same for fewer, and so have their
 *   restrictions to the same places;
 * - configurations with the same `key` for nothing to come have the same kinds and identities;
 * - two elements of a configuration are the same only if the configuration says so: `same` never depends on what is
 *   still to come.
 */
export interface Carrier<Configuration = unknown> {
  readonly description: CarrierDescription;
  /** How many elements; null when there are infinitely many. */
  readonly size: number | null;
  /** The configuration in which nothing has been named. */
  readonly empty: Configuration;

  /**
   * All ways to name one more element, which becomes the last one.
   * @param toCome how many quantifiers lie inside the one that names it
   */
  extensions(configuration: Configuration, toCome: number): readonly Configuration[];

  /** The configuration of the elements at the given places, in that order. */
  restrict(configuration: Configuration, places: readonly number[]): Configuration;

  /** Whether the elements at two places are the same. */
  same(configuration: Configuration, first: number, second: number): boolean;

  /** How many kinds of tuples of that length there are. A table has one entry for each. */
  kindCount(length: number): number;

  /** The kind of the tuple of the elements at the given places (repeats allowed), from 0 to `kindCount − 1`. */
  kindOf(configuration: Configuration, places: readonly number[]): number;

  /**
   * A name that two configurations share only if they need not be told apart with so many quantifiers still to come:
   * the same extensions are listed for both, up to configurations that need not be told apart with one quantifier less.
   */
  key(configuration: Configuration, toCome: number): string | number;

  /**
   * A bound on how many configurations `extensions` lists for one of so many elements; infinite beyond all use. To be
   * looked at before they are listed.
   */
  mostExtensions(named: number, toCome: number): number;

  /**
   * Permutations of the carrier, each its own inverse, under which every structure goes to an isomorphic one, for
   * breaking symmetry. Not all need be listed.
   */
  symmetries(): readonly Symmetry[];
}

/** A permutation of the carrier, by what it does to kinds. */
export interface Symmetry {
  /** The kind to which a tuple of the given length and kind goes. */
  image(length: number, kind: number): number;
}
