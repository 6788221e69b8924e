/** `compare T, U, …`: the order of strength of theories. */
import type { Theory } from "../logic/theory.ts";
import type { CompareAnswer, CompareVerdict, PairAnswer, ShownDerivation } from "./answer.ts";
import { certify } from "./certify.ts";
import { EvidenceWriter } from "./evidence-writer.ts";
import { jointSignature } from "./finite-search.ts";
import { recordQuestion } from "./question-record.ts";
import { type Settled, Settler } from "./settle.ts";
import type { Work } from "./work.ts";

/** For each pair: does the left entail the right, the right the left, and do they contradict each other? */
const SEARCHES_A_PAIR = 3;

interface NamedTheory {
  readonly name: string;
  readonly theory: Theory;
}

/** @param theories at least two, with the names they are to be called by */
export function compareTheories(theories: readonly NamedTheory[], work: Work): CompareAnswer {
  const writer = new EvidenceWriter();
  const members = theories.map(({ theory }) => theory);
  const question = recordQuestion({ ask: "compare", theories: members }, writer);
  const settler = new Settler(jointSignature(members), writer, work);
  let searches = theories.length + SEARCHES_A_PAIR * pairsOf(theories).length;
  const share = () => Math.max(1, Math.floor(settler.left / searches--));
  const inconsistent: { name: string; derivation: ShownDerivation }[] = [];
  for (const { name, theory } of theories) {
    const entailment = { premises: theory.axioms, conclusions: [], from: "", sought: `a model of ${name}` };
    const [derivation] = settler.settle(entailment, share()).derivations;
    if (derivation !== undefined) inconsistent.push({ name, derivation });
  }
  const direction = (from: NamedTheory, to: NamedTheory): Settled | null => {
    const budget = share();
    if (to.theory.axioms.length === 0) return null;
    const sought = `a model of ${from.name} that is none of ${to.name}`;
    return settler.settle(
      { premises: from.theory.axioms, conclusions: to.theory.axioms, from: `from ${from.name}`, sought },
      budget,
    );
  };
  const pairs = pairsOf(theories).map(([left, right]): PairAnswer => {
    const first = theories[left]!;
    const second = theories[right]!;
    const forth = direction(first, second);
    const back = direction(second, first);
    const joint = settler.settle(
      {
        premises: [...first.theory.axioms, ...second.theory.axioms],
        conclusions: [],
        from: "",
        sought: "a common model",
      },
      share(),
    );
    const sides = {
      leftEntailsRight: forth === null || forth.outcome === "derived",
      rightEntailsLeft: back === null || back.outcome === "derived",
      leftOnly: forth?.structure ?? null,
      rightOnly: back?.structure ?? null,
    };
    return {
      left,
      right,
      ...sides,
      verdict: verdictOf(sides),
      common: joint.structure,
      jointlyInconsistent: joint.outcome === "refuted" ? false : joint.outcome === "derived" ? true : null,
      derivations: [forth, back, joint].flatMap((settled) => settled?.derivations ?? []),
    };
  });
  const verdicts = pairs.map((pair) => pair.verdict);
  return {
    question: "compare",
    verdict: pairs.length === 1 ? pairs[0]!.verdict : null,
    steps: settler.steps,
    evidence: writer.isEmpty ? null : certify(writer.finish(question, verdicts), work),
    names: theories.map(({ name }) => name),
    pairs,
    classes: classesOf(
      theories.map(({ name }) => name),
      pairs,
    ),
    inconsistent,
    interrupted: settler.interrupted,
  };
}

/** All pairs of places, in the order (0,1), (0,2), …, (1,2), … */
function pairsOf(things: readonly unknown[]): readonly (readonly [number, number])[] {
  return things.flatMap((_, left) =>
    things.slice(left + 1).map((_, offset) => [left, left + 1 + offset] as const),
  );
}

function verdictOf(
  pair: Pick<PairAnswer, "leftEntailsRight" | "rightEntailsLeft" | "leftOnly" | "rightOnly">,
): CompareVerdict {
  const { leftEntailsRight, rightEntailsLeft } = pair;
  if (leftEntailsRight && rightEntailsLeft) return "equivalent";
  if (leftEntailsRight) return pair.rightOnly === null ? "at-least-as-strong" : "stronger";
  if (rightEntailsLeft) return pair.leftOnly === null ? "at-most-as-strong" : "weaker";
  return pair.leftOnly !== null && pair.rightOnly !== null ? "incomparable" : "open";
}

/** Names of equivalent theories together; what is equivalent to the same is equivalent. */
function classesOf(names: readonly string[], pairs: readonly PairAnswer[]): readonly (readonly string[])[] {
  const first = names.map((_, place) => place);
  for (const { left, right, verdict } of pairs)
    if (verdict === "equivalent") {
      const [kept, joined] = [first[left]!, first[right]!];
      for (const [place, one] of first.entries()) if (one === joined) first[place] = kept;
    }
  const classes = new Map<number, string[]>();
  for (const [place, name] of names.entries())
    classes.set(first[place]!, [...(classes.get(first[place]!) ?? []), name]);
  return [...classes.values()];
}
