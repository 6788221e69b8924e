/** Which verdicts checked facts bear out. */
import { buildCarrier } from "../carriers/build.ts";
import type { Meter } from "../logic/meter.ts";
import { isTrueIn } from "./evaluate.ts";
import type { Evidence, SentenceIndex, TheoryRecord } from "./format.ts";

/** The words that may be said, each with whether the facts support it. */
type Words = Readonly<Record<string, boolean>>;

/** Whether the verdict is one that the facts, all of them true, support. */
export function isBorneOut(evidence: Evidence, meter: Meter): boolean {
  const { question, verdict, sentences } = evidence;
  const shown = new Shown(evidence, meter);
  const says = (words: Words, word: unknown = verdict) =>
    typeof word === "string" && Object.hasOwn(words, word) && words[word] === true;
  const saysEach = (each: readonly Words[]) =>
    Array.isArray(verdict) &&
    verdict.length === each.length &&
    each.every((words, place) => says(words, verdict[place]));
  switch (question.ask) {
    case "entails":
    case "does-not-entail": {
      const yes = shown.entails(question.premises, [question.conclusion]);
      const no = shown.separates(question.premises, [question.conclusion]);
      return says(question.ask === "entails" ? { holds: yes, fails: no } : { holds: no, fails: yes });
    }
    case "true-in":
    case "false-in": {
      const value = isTrueIn(question.structure, sentences[question.sentence]!, meter);
      const holds = value === (question.ask === "true-in");
      return says({ holds, fails: !holds });
    }
    case "weaker": {
      // What the left one says follows from the right one, and not the other way round.
      const { weaker, above } = shown.order(question.left, question.right);
      return says({ holds: weaker, fails: above || shown.separates(question.right, question.left) });
    }
    case "equivalent": {
      const { equivalent, different } = shown.order(question.left, question.right);
      return says({ holds: equivalent, fails: different });
    }
    case "compare":
    case "dualise": {
      const { theories, ask } = question;
      // Before all pairs are gone through: their number grows with the square of what was written.
      if (verdict?.length !== (theories.length * (theories.length - 1)) / 2) return false;
      const pairs = theories.flatMap((left, place) =>
        theories.slice(place + 1).map((right) => shown.order(left, right)),
      );
      return saysEach(
        pairs.map(({ above, below, equivalent, different, ...words }): Words => {
          if (ask === "dualise") return { equivalent, different, open: true };
          return {
            ...words,
            equivalent,
            "at-least-as-strong": above,
            "at-most-as-strong": below,
            open: true,
          };
        }),
      );
    }
    case "independent":
    case "independence": {
      const { axioms, ask } = question;
      const each = axioms.map((axiom, place) => {
        const others = axioms.toSpliced(place, 1);
        const independent = shown.separates(others, [axiom]);
        return { independent, redundant: shown.entails(others, [axiom]), open: true };
      });
      if (ask === "independence") return saysEach(each);
      return says({
        holds: each.every((words) => words.independent),
        fails: each.some((words) => words.redundant),
      });
    }
    case "minimise":
      return Array.isArray(verdict) && areMinimal(question.axioms, verdict, shown);
    case "models":
      return (
        verdict === null && shown.structures.every(({ holds }) => shown.contains(holds, question.axioms))
      );
    default: {
      const { ask, axioms } = question;
      const models = shown.structures.filter(({ holds }) => shown.contains(holds, axioms));
      const consistent = models.length > 0;
      const finite = models.some(
        (fact) => fact.fact === "structure" && buildCarrier(fact.structure.carrier).size !== null,
      );
      const inconsistent = shown.derives(axioms, null);
      const none = shown.excludesFinite(axioms);
      // That there are only infinite models says that there are some.
      const infinite = none && consistent;
      if (ask === "consistent") return says({ holds: consistent, fails: inconsistent });
      if (ask === "infinite-only") return says({ holds: infinite, fails: finite || inconsistent });
      if (ask === "no-finite-model") return says({ holds: none || inconsistent, fails: finite });
      const words = { "infinite-only": infinite, "no-finite-model": none };
      return says({ finite, inconsistent, consistent, ...words });
    }
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
  const isMinimal = (set: readonly number[]) =>
    shown.entails(at(set), axioms) &&
    set.every((place) => shown.separates(at(set.filter((other) => other !== place)), [axioms[place]!]));
  const isAscending = (set: readonly number[]) =>
    set.every((place, i) => place in axioms && place > (set[i - 1] ?? -1));
  const isForm = new Set(words).size === words.length && sets.every((set, i) => set.join() === words[i]);
  if (!isForm || !sets.every((set) => isAscending(set) && isMinimal(set))) return false;
  /** For each structure in which some axiom fails: the places of the axioms that are not said to hold in it. */
  const outsides = shown.structures
    .filter(({ fails }) => fails !== null && shown.contains(axioms, fails))
    .map(({ holds }) => [...axioms.keys()].filter((place) => !shown.contains(holds, [axioms[place]!])));
  let left = MOST_CHOICES;
  return !isComplete || isExhausted([], 0);

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
  readonly structures;
  readonly #derivations;
  readonly #finiteness;
  readonly #meter: Meter;
  readonly #members = new WeakMap<TheoryRecord, ReadonlySet<SentenceIndex>>();

  constructor({ facts }: Evidence, meter: Meter) {
    this.structures = facts.filter((fact) => fact.fact === "structure" || fact.fact === "terms");
    this.#derivations = facts.filter((fact) => fact.fact === "derivation");
    this.#finiteness = facts.filter((fact) => fact.fact === "no-finite-model");
    this.#meter = meter;
  }

  /** Whether axioms are shown to have no finite model. */
  excludesFinite(axioms: TheoryRecord): boolean {
    return this.#finiteness.some((fact) => this.contains(axioms, fact.axioms));
  }

  /** Whether a conclusion, or a contradiction, is derived from premises. */
  derives(premises: TheoryRecord, conclusion: SentenceIndex | null): boolean {
    return this.#derivations.some(
      (fact) =>
        (fact.conclusion === conclusion || fact.conclusion === null) &&
        this.contains(premises, fact.premises),
    );
  }

  /** Whether every axiom of the second theory is in the first or derived from it. */
  entails(first: TheoryRecord, second: TheoryRecord): boolean {
    return second.every((axiom) => this.contains(first, [axiom]) || this.derives(first, axiom));
  }

  /** Whether some structure is a model of the first theory and not of the second. */
  separates(first: TheoryRecord, second: TheoryRecord): boolean {
    return this.structures.some(
      ({ holds, fails }) => fails !== null && this.contains(holds, first) && this.contains(second, fails),
    );
  }

  /** How two theories stand to each other: `above` when the left one entails the right one. */
  order(left: TheoryRecord, right: TheoryRecord) {
    const [above, below] = [this.entails(left, right), this.entails(right, left)];
    const [onlyLeft, onlyRight] = [this.separates(left, right), this.separates(right, left)];
    return {
      ...{ above, below, equivalent: above && below, different: onlyLeft || onlyRight },
      ...{ stronger: above && onlyRight, weaker: below && onlyLeft, incomparable: onlyLeft && onlyRight },
    };
  }

  contains(larger: TheoryRecord, smaller: TheoryRecord): boolean {
    this.#meter.charge(1 + smaller.length);
    const members = this.#members.get(larger) ?? new Set(larger);
    this.#members.set(larger, members);
    return smaller.every((index) => members.has(index));
  }
}
