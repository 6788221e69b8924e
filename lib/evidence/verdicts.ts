/** Which verdicts checked facts bear out. */
import type { Meter } from "../logic/meter.ts";
import { isTrueIn } from "./evaluate.ts";
import type { Evidence, Fact, SentenceIndex, StructureFact, TheoryRecord } from "./format.ts";

/** The words that may be said, each with whether the facts support it. */
type Words = Readonly<Record<string, boolean>>;

/** Whether the verdict is one that the facts, all of them true, support. */
export function isBorneOut(evidence: Evidence, meter: Meter): boolean {
  const { question, verdict } = evidence;
  const shown = new Shown(evidence.facts, meter);
  if (question.ask === "models") return verdict === null && shown.onlyModels(question.axioms);
  if (question.ask === "minimise")
    return Array.isArray(verdict) && areMinimal(question.axioms, verdict, shown);
  const words = wordsFor(evidence, shown, meter);
  const isSupported = (supported: Words, word: unknown) =>
    typeof word === "string" && Object.hasOwn(supported, word) && supported[word] === true;
  if (!Array.isArray(words)) return isSupported(words as Words, verdict);
  return (
    Array.isArray(verdict) &&
    verdict.length === words.length &&
    words.every((supported, place) => isSupported(supported, verdict[place]))
  );
}

function wordsFor({ question, sentences }: Evidence, shown: Shown, meter: Meter): Words | readonly Words[] {
  switch (question.ask) {
    case "entails":
    case "does-not-entail": {
      const yes = shown.entails(question.premises, [question.conclusion]);
      const no = shown.separates(question.premises, [question.conclusion]);
      return question.ask === "entails" ? { holds: yes, fails: no } : { holds: no, fails: yes };
    }
    case "true-in":
    case "false-in": {
      const value = isTrueIn(question.structure, sentences[question.sentence]!, meter);
      const holds = value === (question.ask === "true-in");
      return { holds, fails: !holds };
    }
    case "weaker": {
      // What it says follows from the other, and not the other way round.
      const { above, below, onlyRight, onlyLeft } = shown.order(question.left, question.right);
      return { holds: below && onlyLeft, fails: above || onlyRight };
    }
    case "equivalent": {
      const { above, below, onlyRight, onlyLeft } = shown.order(question.left, question.right);
      return { holds: above && below, fails: onlyRight || onlyLeft };
    }
    case "compare":
    case "dualise":
      return question.theories.flatMap((left, place) =>
        question.theories.slice(place + 1).map((right): Words => {
          const { above, below, onlyRight, onlyLeft } = shown.order(left, right);
          const equivalent = above && below;
          if (question.ask === "dualise") return { equivalent, different: onlyRight || onlyLeft, open: true };
          return {
            equivalent,
            stronger: above && onlyRight,
            weaker: below && onlyLeft,
            incomparable: onlyLeft && onlyRight,
            "at-least-as-strong": above,
            "at-most-as-strong": below,
            open: true,
          };
        }),
      );
    case "independent":
    case "independence": {
      const words = question.axioms.map((axiom, place): Words => {
        const others = question.axioms.toSpliced(place, 1);
        return {
          independent: shown.separates(others, [axiom]),
          redundant: shown.entails(others, [axiom]),
          open: true,
        };
      });
      if (question.ask === "independence") return words;
      return {
        holds: words.every((word) => word.independent),
        fails: words.some((word) => word.redundant),
      };
    }
    default:
      return wordsOfModels(question.ask, question.axioms, shown);
  }
}

/** The words for questions of which models there are. */
function wordsOfModels(ask: string, axioms: TheoryRecord, shown: Shown): Words {
  const inconsistent = shown.contradicts(axioms);
  const finite = shown.hasModel(axioms, true);
  switch (ask) {
    case "consistent":
      return { holds: shown.hasModel(axioms, false), fails: inconsistent };
    case "infinite-only":
      // It says that there are models, and only infinite ones.
      return { fails: finite || inconsistent };
    case "no-finite-model":
      return { holds: inconsistent, fails: finite };
    case "check-finite":
      return { finite, inconsistent };
    default:
      return {};
  }
}

/** Choices of places that are looked at to see that a list of sets is complete. */
const MOST_CHOICES = 100_000;

/**
 * Whether each word of the list, places of axioms as in `"0,2,3"`, names axioms which entail all and of which none is
 * entailed by the others; and when `"complete"` stands before them, whether they are all such sets there are.
 */
function areMinimal(axioms: TheoryRecord, verdict: readonly string[], shown: Shown): boolean {
  const isComplete = verdict[0] === "complete";
  const words = isComplete ? verdict.slice(1) : verdict;
  const sets = words.map((word) => (word === "" ? [] : word.split(",").map(Number)));
  const at = (places: readonly number[]) => places.map((place) => axioms[place]!);
  const outsides = isComplete ? shown.outsides(axioms) : [];
  let left = MOST_CHOICES;
  return (
    new Set(words).size === words.length &&
    sets.every(
      (set, index) =>
        set.join() === words[index] &&
        set.every((place, i) => place in axioms && place > (set[i - 1] ?? -1)) &&
        shown.entails(at(set), axioms) &&
        set.every((place) => shown.separates(at(set.filter((other) => other !== place)), [axioms[place]!])),
    ) &&
    (!isComplete || isExhausted([], 0))
  );

  /**
   * A set of axioms is not enough when a structure is a model of it where some axiom fails. So a set that is enough has,
   * for each structure, a place outside of those that hold in it: the sets made of one such place for each structure
   * are in all others that are enough, and each must have one of the listed sets in it.
   */
  function isExhausted(chosen: readonly number[], next: number): boolean {
    left -= 1;
    if (left < 0) return false;
    if (sets.some((set) => set.every((place) => chosen.includes(place)))) return true;
    const outside = outsides[next];
    if (outside === undefined) return false;
    if (outside.some((place) => chosen.includes(place))) return isExhausted(chosen, next + 1);
    return outside.every((place) => isExhausted([...chosen, place], next + 1));
  }
}

/** What checked facts show about theories. */
class Shown {
  readonly #facts: readonly Fact[];
  readonly #meter: Meter;
  readonly #members = new WeakMap<TheoryRecord, ReadonlySet<SentenceIndex>>();

  constructor(facts: readonly Fact[], meter: Meter) {
    this.#facts = facts;
    this.#meter = meter;
  }

  /** Whether every axiom of the second theory is in the first or derived from it. */
  entails(first: TheoryRecord, second: TheoryRecord): boolean {
    return second.every((axiom) => this.#contains(first, [axiom]) || this.#derives(first, axiom));
  }

  /** Whether a contradiction is derived. */
  contradicts(theory: TheoryRecord): boolean {
    return this.#derives(theory, null);
  }

  /** Whether some structure is a model of the first theory and not of the second. */
  separates(first: TheoryRecord, second: TheoryRecord): boolean {
    return this.#structures().some(
      (fact) =>
        fact.fails !== null && this.#contains(fact.holds, first) && this.#contains(second, fact.fails),
    );
  }

  /** Whether some structure, or some finite one, is a model of the theory. */
  hasModel(theory: TheoryRecord, finite: boolean): boolean {
    return this.#structures().some(
      ({ structure, holds }) =>
        (!finite || structure.carrier.kind === "points") && this.#contains(holds, theory),
    );
  }

  /** Whether every structure is a model of the theory. */
  onlyModels(theory: TheoryRecord): boolean {
    return this.#structures().every((fact) => this.#contains(fact.holds, theory));
  }

  /** How two theories stand to each other. */
  order(left: TheoryRecord, right: TheoryRecord) {
    return {
      /** The left one entails the right one. */
      above: this.entails(left, right),
      below: this.entails(right, left),
      /** Some structure is a model of the left one only. */
      onlyLeft: this.separates(left, right),
      onlyRight: this.separates(right, left),
    };
  }

  /** For each structure in which some axiom fails: the places of the axioms that are not said to hold in it. */
  outsides(axioms: TheoryRecord): number[][] {
    return this.#structures()
      .filter((fact) => fact.fails !== null && this.#contains(axioms, fact.fails))
      .map((fact) => [...axioms.keys()].filter((place) => !this.#contains(fact.holds, [axioms[place]!])));
  }

  #structures(): readonly StructureFact[] {
    return this.#facts.filter((fact) => fact.fact === "structure");
  }

  #derives(premises: TheoryRecord, conclusion: SentenceIndex | null): boolean {
    return this.#facts.some(
      (fact) =>
        fact.fact === "derivation" &&
        (fact.conclusion === conclusion || fact.conclusion === null) &&
        this.#contains(premises, fact.premises),
    );
  }

  #contains(larger: TheoryRecord, smaller: TheoryRecord): boolean {
    this.#meter.charge(1 + smaller.length);
    let members = this.#members.get(larger);
    if (members === undefined) {
      members = new Set(larger);
      this.#members.set(larger, members);
    }
    return smaller.every((index) => members.has(index));
  }
}
