/**
 * The fixed list of turns that a search for a derivation goes through, and what each becomes for a task. Short and various
 * turns first: most of what can be derived at all is derived within a few hundred clauses by some strategy on some of
 * the premises, and a strategy that fails at first often fails for long.
 */
import type { Formula } from "../logic/formula.ts";
import { relationsOf, usesIdentity } from "../logic/formula.ts";
import type { DerivationTask, Engine, Turn } from "./derive.ts";
import { DEFAULT_STRATEGY, type Strategy } from "./saturation/strategy.ts";

/** Which premises a turn looks at; those but `all` give no turn where they are all premises or have been had. */
export type PremiseChoice =
  | "all"
  /** Those without `=`, where the conclusion has none either. */
  | "without-identity"
  /** Those whose relations all occur in the conclusion. */
  | "related"
  /** A turn for each premise: all others. */
  | "all-but-one"
  /** A turn for each premise: that alone. */
  | "one";

export interface PlannedTurn {
  readonly name: string;
  readonly engine: Engine;
  readonly premises: PremiseChoice;
  readonly unfold: boolean;
  readonly miniscope: boolean;
  readonly letters: boolean;
  readonly mostClauses: number;
  /** Clauses that each of its turns may generate. */
  readonly clauses: number;
}

/** What is not said of a turn. */
const PLAIN = {
  premises: "all",
  unfold: true,
  miniscope: false,
  letters: false,
  mostClauses: 32,
} as const;

const instances: Engine = { by: "instances" };

function by(strategy: Partial<Strategy> = {}): Engine {
  return { by: "saturation", strategy: { ...DEFAULT_STRATEGY, ...strategy } };
}

/** Good on nearly everything: functions of the goal and seldom symbols first. */
const main: Partial<Strategy> = { precedence: "rare", literalWeight: 1, goalFunctionWeight: 1 };
/** What comes from the negated conclusion counts a third. */
const goalFirst: Partial<Strategy> = { ...main, goalFactor: 1, otherFactor: 3 };
/** Terms in a lexicographic path ordering, light literals resolved seldom. */
const byPath: Partial<Strategy> = {
  ...main,
  selection: "groundest",
  ordering: "path",
  byWeight: 12,
  literalWeight: 3,
};
const fewLiterals: Partial<Strategy> = {
  selection: "fewest-partners",
  ordering: "path",
  precedence: "frequent",
  literalWeight: 6,
  functionWeight: 1,
  goalFunctionWeight: 1,
  goalFactor: 1,
  otherFactor: 1,
};
/** Nothing but what comes from the negated conclusion. */
const supported: Partial<Strategy> = {
  ...main,
  selectsSparingly: false,
  isSupported: true,
  goalFactor: 1,
  otherFactor: 1,
};
/** Supported, and only short clauses with hardly nested terms: over soon. */
const small: Partial<Strategy> = {
  selection: "fewest-partners",
  ordering: "path",
  precedence: "rare",
  literalWeight: 6,
  functionWeight: 3,
  goalFunctionWeight: 3,
  variableWeight: 2,
  goalFactor: 1,
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
/** Nothing but functions weighs anything: for long clauses about few elements. */
const elements: Partial<Strategy> = {
  selectsSparingly: false,
  ordering: "path",
  precedence: "frequent",
  byAge: 0,
  byWeight: 1,
  literalWeight: 1,
  relationWeight: 0,
  functionWeight: 1,
  goalFunctionWeight: 1,
  variableWeight: 0,
  goalFactor: 1,
  otherFactor: 1,
  mostDepth: 4,
  mostLiterals: 16,
};

const named = { ...PLAIN, mostClauses: 2 } as const;
const written = { ...PLAIN, unfold: false } as const;
const withoutIdentity = { ...PLAIN, premises: "without-identity" } as const;

export const TURNS: readonly PlannedTurn[] = [
  { ...PLAIN, name: "as letters", engine: instances, letters: true, clauses: 100 },
  { ...written, name: "as written, goal first", engine: by(goalFirst), clauses: 60 },
  { ...PLAIN, name: "small", engine: by(small), clauses: 200 },
  { ...PLAIN, name: "unfolded", engine: by(main), clauses: 60 },
  { ...withoutIdentity, name: "without identity, by path", engine: by(byPath), clauses: 60 },
  { ...withoutIdentity, name: "without identity, supported", engine: by(supported), clauses: 150 },
  { ...PLAIN, name: "instances", engine: instances, clauses: 150 },
  { ...PLAIN, name: "unfolded, by path", engine: by(byPath), clauses: 300 },
  { ...written, name: "as written", engine: by(main), clauses: 400 },
  { ...PLAIN, name: "related", premises: "related", engine: by(main), clauses: 800 },
  { ...PLAIN, name: "all premises but one", premises: "all-but-one", engine: by(main), clauses: 100 },
  { ...named, name: "named, goal first", engine: by(goalFirst), clauses: 300 },
  { ...PLAIN, name: "instances", engine: instances, clauses: 400 },
  { ...written, name: "few literals", engine: by(fewLiterals), clauses: 300 },
  { ...withoutIdentity, name: "without identity", engine: by(main), clauses: 800 },
  { ...PLAIN, name: "elements", engine: by(elements), clauses: 1_500 },
  { ...named, name: "instances", engine: instances, clauses: 2_500 },
  { ...withoutIdentity, name: "without identity, goal first", engine: by(goalFirst), clauses: 3_000 },
];

/** Those that come again and again after the list, each time with {@link GROWTH} times as many clauses. */
export const ENDLESS_TURNS: readonly PlannedTurn[] = [
  { ...PLAIN, name: "moderate", engine: by(moderate), clauses: 14_000 },
  { ...PLAIN, name: "unfolded", engine: by(), clauses: 20_000 },
  { ...PLAIN, name: "instances", engine: instances, clauses: 6_000 },
  { ...written, name: "few literals", engine: by(fewLiterals), clauses: 16_000 },
  { ...PLAIN, name: "goal first", engine: by(goalFirst), clauses: 22_000 },
  { ...PLAIN, name: "elements", engine: by(elements), clauses: 4_000 },
  { ...withoutIdentity, name: "without identity", engine: by(main), clauses: 10_000 },
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
    case "one":
      return all.length < 3 ? [] : all.map((place) => [place]);
  }
}
