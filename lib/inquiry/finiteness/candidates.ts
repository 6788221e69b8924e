/** The reasons that are tried, best first. */
import { and, equal, exists, type Formula, not, verum } from "../../logic/formula.ts";
import type { Signature } from "../../logic/theory.ts";
import type { Clues } from "./clues.ts";
import * as parts from "./parts.ts";
import { type FinitenessReason, type PrincipleShape, reasonOf } from "./reason.ts";

/** A reason for all elements, and for parts of them. */
export interface Family {
  readonly shape: PrincipleShape;
  readonly relation: Formula;
  readonly everywhere: FinitenessReason;
  /** Families of which this one says nothing new where one of them has its obligations on the relation derived. */
  readonly covers: readonly Family[];
}

export class Candidates {
  /** For all elements. */
  readonly likely: readonly Family[];
  readonly #signature: Signature;
  readonly #clues: Clues;
  readonly #different: "identity" | readonly (readonly [string, number])[];
  readonly #bases: readonly Formula[];
  readonly #families = new Map<string, Family>();
  readonly #domains: readonly parts.UnaryPart[];

  constructor(signature: Signature, clues: Clues) {
    this.#signature = signature;
    this.#clues = clues;
    this.#different = signature.identity
      ? "identity"
      : signature.relations.map(({ name, places }) => [name, places] as const);
    this.#bases = parts.basesOf(signature, clues);
    this.likely = this.#likely();
    this.#domains = this.#listDomains();
  }
}
