/**
 * The fixed list of turns that a search for a derivation goes through, and what each becomes for a task. Short and various
 * turns first: most of what can be derived at all is derived within a few hundred clauses by some strategy on some of
 * the premises, and a strategy that fails at first often fails for long.
 */
import type { Formula } from "../logic/formula.ts";
import { relationsOf, usesIdentity } from "../logic/formula.ts";
import type { DerivationTask, Engine, Turn } from "./derive.ts";
import {
  BROAD_STRATEGY,
  CAREFUL_STRATEGY,
  DEFAULT_STRATEGY,
  DIRECT_STRATEGY,
  GROUND_STRATEGY,
  SPLITTING_STRATEGY,
  type Strategy,
  SUPPORTED_STRATEGY,
  TERSE_STRATEGY,
} from "./saturation/strategy.ts";

/** Which premises a turn looks at. A choice other than `all` that comes to all of them gives no turn. */
export type PremiseChoice =
  | "all"
  /** Those without `=`, where the conclusion has none either. */
  | "without-identity"
  /** Those whose relations all occur in the conclusion. */
  | "related"
  /** A turn for each premise: all others. */
  | "all-but-one";

export interface PlannedTurn {
  readonly name: string;
  readonly engine: Engine;
  readonly premises: PremiseChoice;
  readonly unfold: boolean;
  readonly miniscope: boolean;
  readonly letters: "none" | "alone" | "defined";
  readonly mostClauses: number;
  /** Clauses that each of its turns may generate. */
  readonly clauses: number;
}

/** What is not said of a turn. */
const PLAIN = {
  premises: "all",
  unfold: true,
  miniscope: false,
  letters: "none",
  mostClauses: 32,
} as const;

const instances: Engine = { by: "instances" };

function by(strategy: Partial<Strategy> = {}): Engine {
  return { by: "saturation", strategy: { ...DEFAULT_STRATEGY, ...strategy } };
}

/*
 * Strategies beside those of the engine. They and the list below were chosen by measuring, on tests/data, which turns
 * derive most of what the turns before leave open, for the clauses that they cost (tests/benchmarks/derivation.ts).
 */

function cases(strategy: Strategy): Engine {
  return { by: "cases", strategy };
}

const main: Partial<Strategy> = { precedence: "rare", literalWeight: 1, goalFunctionWeight: 1 };
/** What comes from the negated conclusion counts a third. */
const goalFirst: Partial<Strategy> = { ...main, goalFactor: 1, otherFactor: 3 };
/** Nothing but what comes from the negated conclusion. */
const supported: Partial<Strategy> = {
  ...main,
  selectsSparingly: false,
  isSupported: true,
  goalFactor: 1,
  otherFactor: 1,
};
const fewPartners: Partial<Strategy> = {
  selection: "fewest-partners",
  ordering: "path",
  precedence: "frequent",
  literalWeight: 6,
  functionWeight: 1,
  goalFunctionWeight: 1,
  goalFactor: 1,
  otherFactor: 1,
};
/** Supported, and only short clauses with hardly nested terms: over soon. */
const small: Partial<Strategy> = {
  ...fewPartners,
  precedence: "rare",
  functionWeight: 3,
  goalFunctionWeight: 3,
  variableWeight: 2,
  otherFactor: 6,
  isSupported: true,
  mostDepth: 2,
  mostLiterals: 4,
};
/** Clauses of a moderate size, premises before the goal: for long ways through few kinds of clauses. */
const moderate: Partial<Strategy> = {
  selectsSparingly: false,
  byWeight: 3,
  literalWeight: 1,
  functionWeight: 1,
  goalFunctionWeight: 1,
  goalFactor: 3,
  otherFactor: 2,
  mostDepth: 4,
  mostLiterals: 6,
};
/** Literals and functions are all that weighs: for long clauses about few elements. */
const elements: Partial<Strategy> = {
  ...moderate,
  ordering: "path",
  precedence: "frequent",
  byAge: 0,
  byWeight: 1,
  relationWeight: 0,
  variableWeight: 0,
  goalFactor: 1,
  otherFactor: 1,
  mostLiterals: 16,
};

const named = { ...PLAIN, mostClauses: 2 } as const;
const written = { ...PLAIN, unfold: false } as const;
const withoutIdentity = { ...PLAIN, premises: "without-identity" } as const;

export const TURNS: readonly PlannedTurn[] = [
  { ...PLAIN, name: "as letters", engine: instances, letters: "alone", clauses: 100 },
  { ...PLAIN, name: "supported", engine: by(supported), clauses: 60 },
  { ...written, name: "as written, terse", engine: by(TERSE_STRATEGY), clauses: 100 },
  { ...withoutIdentity, name: "without identity, few partners", engine: by(fewPartners), clauses: 100 },
  { ...withoutIdentity, name: "without identity, broad", engine: by(BROAD_STRATEGY), clauses: 150 },
  { ...PLAIN, name: "instances", engine: instances, clauses: 120 },
  { ...PLAIN, name: "supported, shallow", engine: by(SUPPORTED_STRATEGY), clauses: 300 },
  { ...PLAIN, name: "broad", engine: by(BROAD_STRATEGY), clauses: 80 },
  { ...written, name: "as written, direct", engine: by(DIRECT_STRATEGY), clauses: 600 },
  {
    ...PLAIN,
    name: "all premises but one",
    premises: "all-but-one",
    engine: by(TERSE_STRATEGY),
    clauses: 80,
  },
  { ...PLAIN, name: "cases", engine: cases(TERSE_STRATEGY), letters: "defined", clauses: 600 },
  { ...PLAIN, name: "related premises", premises: "related", engine: by(goalFirst), clauses: 800 },
  { ...PLAIN, name: "small", engine: by(small), clauses: 800 },
  { ...PLAIN, name: "instances", engine: instances, clauses: 400 },
  { ...named, name: "named, goal first", engine: by(goalFirst), clauses: 400 },
  { ...PLAIN, name: "ground", engine: by(GROUND_STRATEGY), clauses: 700 },
  { ...PLAIN, name: "careful", engine: by(CAREFUL_STRATEGY), clauses: 800 },
  { ...PLAIN, name: "instances", engine: instances, clauses: 2_800 },
  { ...withoutIdentity, name: "without identity, terse", engine: by(TERSE_STRATEGY), clauses: 2_000 },
];

/** Those that come again and again after the list, each time with {@link GROWTH} times as many clauses. */
export const ENDLESS_TURNS: readonly PlannedTurn[] = [
  { ...PLAIN, name: "cases", engine: cases(SUPPORTED_STRATEGY), letters: "defined", clauses: 20_000 },
  { ...PLAIN, name: "splitting", engine: by(SPLITTING_STRATEGY), clauses: 13_500 },
  { ...PLAIN, name: "instances", engine: instances, clauses: 6_000 },
  { ...PLAIN, name: "elements", engine: by(elements), clauses: 13_000 },
  { ...PLAIN, name: "direct", engine: by(DIRECT_STRATEGY), clauses: 10_000 },
  { ...PLAIN, name: "ground", engine: by(GROUND_STRATEGY), clauses: 12_000 },
  { ...PLAIN, name: "moderate", engine: by(moderate), clauses: 14_000 },
  { ...written, name: "as written", engine: by(), clauses: 20_000 },
  { ...withoutIdentity, name: "without identity, terse", engine: by(TERSE_STRATEGY), clauses: 8_000 },
  { ...PLAIN, name: "careful", engine: by(CAREFUL_STRATEGY), clauses: 16_000 },
  { ...PLAIN, name: "miniscoped, goal first", miniscope: true, engine: by(goalFirst), clauses: 8_000 },
];

export const GROWTH = 4;

/** The turns that a planned one comes to for a task. */
export function turnsOf({ engine, clauses, ...plan }: PlannedTurn, task: DerivationTask): readonly Turn[] {
  return choicesOf(plan.premises, task).map((premises) => ({
    engine,
    clauses,
    preparation: { ...plan, premises },
  }));
}

/** The premises, by place, for each turn. */
function choicesOf(choice: PremiseChoice, { premises, conclusion }: DerivationTask): readonly number[][] {
  const all = premises.map((_, place) => place);
  const some = (isWanted: (premise: Formula) => boolean): readonly number[][] => {
    const wanted = all.filter((place) => isWanted(premises[place]!));
    return wanted.length < all.length ? [wanted] : [];
  };
  switch (choice) {
    case "all":
      return [all];
    case "without-identity":
      return conclusion !== null && usesIdentity(conclusion) ? [] : some((premise) => !usesIdentity(premise));
    case "related": {
      if (conclusion === null) return [];
      const wanted = new Set(relationsOf(conclusion).map(({ name }) => name));
      return some((premise) => relationsOf(premise).every(({ name }) => wanted.has(name)));
    }
    case "all-but-one":
      return all.length < 2 ? [] : all.map((left) => all.filter((place) => place !== left));
  }
}
