/** How a saturation is steered. */

export interface Strategy {
  /**
   * Which negative literal an inference with a clause must use, if there is one; published variants of resolution with
   * selection (Bachmair & Ganzinger 1994).
   * - `none`: the ordering alone decides;
   * - `heaviest`, `lightest`: the negative literal of most, of fewest symbols;
   * - `groundest`: the one of fewest variables, of those the heaviest;
   * - `fewest-partners`: the one that can be resolved with fewest of the active clauses (Hoder, Reger, Suda &
   *   Voronkov 2016).
   */
  readonly selection: "none" | "heaviest" | "lightest" | "groundest" | "fewest-partners";
  /** Selects only where no positive literal is greater than all other literals. */
  readonly selectsSparingly: boolean;
  /** `weight`: Knuth & Bendix 1970; `path`: lexicographic path ordering; `none`: every literal counts as maximal. */
  readonly ordering: "weight" | "path" | "none";
  /** Which symbols are great: those of many places, those that occur seldom, or those that occur often. */
  readonly precedence: "places" | "rare" | "frequent";
  /** Clauses picked by age, then by weight, in each round. */
  readonly byAge: number;
  readonly byWeight: number;
  /** The weight of a clause by which it waits: the sum over its literals, in each of them over its symbols. */
  readonly literalWeight: number;
  readonly relationWeight: number;
  readonly functionWeight: number;
  /** In place of {@link functionWeight} for functions that occur in the negated conclusion. */
  readonly goalFunctionWeight: number;
  readonly variableWeight: number;
  /** By what the weight is multiplied for clauses that come from the negated conclusion, and for others. */
  readonly goalFactor: number;
  readonly otherFactor: number;
  /** No inferences among premises alone (Wos, Robinson & Carson 1965); never complete here. */
  readonly isSupported: boolean;
  /** Larger clauses are dropped, and then a run never says `saturated`: symbols, depth of terms, literals. */
  readonly mostWeight: number;
  readonly mostDepth: number;
  readonly mostLiterals: number;
}

/** Good on nearly everything; the first to try. */
export const DEFAULT_STRATEGY: Strategy = {
  selection: "heaviest",
  selectsSparingly: true,
  ordering: "weight",
  precedence: "places",
  byAge: 1,
  byWeight: 5,
  literalWeight: 3,
  relationWeight: 1,
  functionWeight: 2,
  goalFunctionWeight: 2,
  variableWeight: 1,
  goalFactor: 2,
  otherFactor: 3,
  isSupported: false,
  mostWeight: 100,
  mostDepth: 16,
  mostLiterals: 40,
};

/** Always selects, and prefers functions of the goal: for axioms whose clauses are large, as unfolded definitions. */
export const RARE_STRATEGY: Strategy = { ...DEFAULT_STRATEGY, selectsSparingly: false, precedence: "rare" };

/**
 * No ordering of literals and terms that stay shallow: for long clauses and nested witnesses, where the default drowns
 * in deep terms. Not complete.
 */
export const SHALLOW_STRATEGY: Strategy = {
  ...DEFAULT_STRATEGY,
  ordering: "none",
  precedence: "frequent",
  literalWeight: 0,
  functionWeight: 5,
  goalFunctionWeight: 3,
  variableWeight: 3,
  goalFactor: 1,
  otherFactor: 4,
  mostDepth: 4,
};

/** Only what comes from the negated conclusion: for many premises of which few matter. Not complete. */
export const SUPPORTED_STRATEGY: Strategy = {
  ...DEFAULT_STRATEGY,
  selectsSparingly: false,
  isSupported: true,
};

/** No selection: for cases that are finite and ground after some steps. */
export const UNSELECTED_STRATEGY: Strategy = { ...DEFAULT_STRATEGY, selection: "none" };
