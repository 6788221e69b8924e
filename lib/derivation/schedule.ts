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

export const TURNS: readonly PlannedTurn[] = [
  { ...PLAIN, name: "as letters", engine: instances, letters: true, clauses: 100 },
  { ...PLAIN, name: "unfolded", engine: by(), clauses: 150 },
  { ...PLAIN, name: "instances", engine: instances, clauses: 300 },
  { ...PLAIN, name: "as written", engine: by(), unfold: false, clauses: 300 },
];

/** Those that come again and again after the list, each time with {@link GROWTH} as many clauses. */
export const ENDLESS_TURNS: readonly PlannedTurn[] = [
  { ...PLAIN, name: "unfolded", engine: by(), clauses: 2_000 },
  { ...PLAIN, name: "instances", engine: instances, clauses: 1_000 },
  { ...PLAIN, name: "as written", engine: by(), unfold: false, clauses: 1_000 },
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
