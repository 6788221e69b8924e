/** `dualise T`: the theory, its converse, its complement and both; which of the four coincide. */
import { complementTheory, converseTheory, type Theory } from "../logic/theory.ts";
import type { DualAnswer, DualPair } from "./answer.ts";
import { certify } from "./certify.ts";
import { EvidenceWriter } from "./evidence-writer.ts";
import { jointSignature } from "./finite-search.ts";
import { recordQuestion } from "./question-record.ts";
import { Settler } from "./settle.ts";
import type { Work } from "./work.ts";

/** Six pairs of the four, each in two directions. */
const SEARCHES = 12;

/** The four theories, with names made from that of the first. */
export function dualsOf(
  name: string,
  theory: Theory,
): readonly { readonly name: string; readonly theory: Theory }[] {
  const converse = converseTheory(theory);
  return [
    { name, theory },
    { name: `converse(${name})`, theory: converse },
    { name: `complement(${name})`, theory: complementTheory(theory) },
    { name: `complement(converse(${name}))`, theory: complementTheory(converse) },
  ];
}

export function askDuals(name: string, theory: Theory, work: Work): DualAnswer {
  const writer = new EvidenceWriter();
  const duals = dualsOf(name, theory);
  const theories = duals.map((dual) => dual.theory);
  const question = recordQuestion({ ask: "dualise", theories }, writer);
  const settler = new Settler(jointSignature(theories), writer, work);
  let searches = SEARCHES;
  const direction = (from: number, to: number) =>
    settler.settle(
      {
        premises: theories[from]!.axioms,
        conclusions: theories[to]!.axioms,
        from: `from ${duals[from]!.name}`,
        sought: `a model of ${duals[from]!.name} that is none of ${duals[to]!.name}`,
      },
      Math.max(1, Math.floor(settler.left / searches--)),
    );
  const compare = (left: number, right: number): DualPair => {
    // Without axioms there is nothing that the duals could differ in.
    if (theory.axioms.length === 0)
      return { left, right, verdict: "equivalent", witness: null, derivations: [] };
    const different = (
      structure: NonNullable<DualPair["witness"]>["structure"],
      modelOf: number,
    ): DualPair => ({
      left,
      right,
      verdict: "different",
      witness: { structure, modelOf },
      derivations: [],
    });
    const forth = direction(left, right);
    if (forth.structure !== null) return different(forth.structure, left);
    const back = direction(right, left);
    if (back.structure !== null) return different(back.structure, right);
    const isEquivalent = forth.outcome === "derived" && back.outcome === "derived";
    return {
      left,
      right,
      verdict: isEquivalent ? "equivalent" : "open",
      witness: null,
      derivations: isEquivalent ? [...forth.derivations, ...back.derivations] : [],
    };
  };
  const pairs: DualPair[] = [];
  for (const left of duals.keys())
    for (const right of duals.keys()) if (right > left) pairs.push(compare(left, right));
  const verdicts = pairs.map((pair) => pair.verdict);
  return {
    question: "dualise",
    verdict: null,
    steps: settler.steps,
    evidence: verdicts.some((verdict) => verdict !== "open")
      ? certify(writer.finish(question, verdicts), work)
      : null,
    duals,
    pairs,
    interrupted: settler.interrupted,
  };
}
