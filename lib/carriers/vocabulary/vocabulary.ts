/** What definitions on a carrier may say of its elements. The searches and the checker do without it. */
import type { CarrierAtom } from "../../logic/structure-definition.ts";

/** What is wrong with an atom on a carrier, for people. */
export interface Complaint {
  /** As a sentence without a full stop: "the rational line has no next elements, so `x + 1` says nothing there". */
  readonly message: string;
  /** What to write instead; null when nothing comes near. */
  readonly suggestion: string | null;
  /**
   * That the atom does say something there, and the kinds of the carrier do not tell whether it is true: its offset or
   * ends are too small. In a sum an atom that says nothing in one part is false there, and one that is unsettled is not.
   */
  readonly isUnsettled?: true;
}

/**
 * The atoms of one carrier. Variables have no path where the carrier is not made of others; the vocabulary of one that is
 * strips its part of the path and asks that of the component.
 */
export interface Vocabulary<Configuration> {
  /** Null when the atom says something on this carrier. Numbers too large for its offset or ends are complained of too. */
  complaint(atom: CarrierAtom): Complaint | null;

  /**
   * Whether an atom without complaint is true of named elements. An atom about components that are not there (the second
   * coordinate of a single point), or about elements of different parts or copies that it cannot compare, is false.
   * @param place where in the configuration the element stands that a variable is for
   */
  holds(atom: CarrierAtom, configuration: Configuration, place: (variable: string) => number): boolean;

  /**
   * Atoms that together tell all kinds of tuples of as many elements as there are variables apart, the simplest first;
   * what a found structure is written down with.
   */
  atoms(variables: readonly string[]): readonly CarrierAtom[];
}
