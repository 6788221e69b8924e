/** Why a theory has no finite model: a paragraph that can stand in a paper, and below it what it takes from the axioms. */
import type { ShownObligation, ShownReason } from "../../lib/inquiry/answer.ts";
import type { FinitenessReason } from "../../lib/inquiry/finiteness/search.ts";
import { printFormula } from "../../lib/language/printer.ts";
import {
  atom,
  type Formula,
  type RelationSymbol,
  relationsOf,
  sameFormula,
} from "../../lib/logic/formula.ts";
import type {
  ComprehensionRecord,
  CountingRecord,
  EndlessOrderRecord,
  PairsRecord,
  PrincipleRecord,
} from "../../lib/logic/records/finiteness.ts";
import type { Axiom } from "../../lib/logic/theory.ts";
import {
  type Block,
  enumerated,
  formulaOf,
  type Inline,
  type Maths,
  mathOf,
  strong,
  termOf,
  words,
} from "./blocks.ts";
import { showDerivations } from "./derivations.ts";
import { counted, enumerate } from "./text.ts";

/** Axioms that a sentence names; more are counted. */
const NAMED_AXIOMS = 6;

/**
 * The paragraph, and folded below it the sentences that it takes from the axioms, with their derivations.
 * @param axioms of the theory that has no finite model
 */
export function reasonBlocks(shown: ShownReason, axioms: readonly Axiom[]): readonly Block[] {
  return [
    { kind: "paragraph", parts: [strong("No finite model."), " ", ...reasonParagraph(shown, axioms)] },
    obligationsFold(shown.obligations, axioms),
  ];
}

/** The reason as a paragraph that stands by itself. */
export function reasonParagraph(
  { reason, obligations }: ShownReason,
  axioms: readonly Axiom[],
): readonly Inline[] {
  return new Paragraph(reason, usedLabels(obligations, axioms)).parts();
}

/** What the reason rests on: `by irr, trans and up`. */
export function reasonSource({ obligations }: ShownReason, axioms: readonly Axiom[]): string {
  const labels = usedLabels(obligations, axioms);
  if (labels.length === 0) return "by the axioms";
  return `by ${labels.length > NAMED_AXIOMS ? counted(labels.length, "axiom") : enumerate(labels)}`;
}

/** The labels of the axioms that some obligations rest on, in the order of the theory. */
export function usedLabels(
  obligations: readonly ShownObligation[],
  axioms: readonly Axiom[],
): readonly string[] {
  const used = new Set(
    obligations.flatMap(({ formula, derivation }) =>
      derivation === null
        ? axioms.filter((axiom) => sameFormula(axiom.formula, formula)).map(({ label }) => label)
        : derivation.premises.map(({ label }) => label),
    ),
  );
  return axioms.map(({ label }) => label).filter((label) => used.has(label));
}

/** For `eval --json`: the principle, and its formulas in the ASCII spelling. */
export function reasonData(reason: FinitenessReason): Readonly<Record<string, unknown>> {
  const { record, parameters, given, domain, relation } = reason;
  const ascii = (formula: Formula) => printFormula(formula, "ascii");
  const counts =
    record.principle === "counting"
      ? { successors: record.successors, predecessors: record.predecessors, spare: record.spare }
      : record.principle === "pairs"
        ? { pairs: record.pairs }
        : {};
  return {
    principle: record.principle,
    ...counts,
    domain: ascii(domain),
    relation: ascii(relation),
    ...(given === null ? {} : { parameters, given: ascii(given) }),
  };
}

function obligationsFold(obligations: readonly ShownObligation[], axioms: readonly Axiom[]): Block {
  const derivations = obligations.flatMap(({ derivation }) => (derivation === null ? [] : [derivation]));
  const table: Block = {
    kind: "table",
    caption: null,
    head: ["what is needed", "from", "sentence"],
    rows: obligations.map((obligation) => [
      [obligation.role],
      [sourceText(obligation, axioms)],
      [formulaOf(obligation.formula)],
    ]),
    look: "prose",
  };
  return {
    kind: "fold",
    title: `What this takes from the axioms: ${counted(obligations.length, "sentence")}, ${derivedCount(
      derivations.length,
      obligations.length,
    )}`,
    blocks: [table, ...showDerivations(derivations)],
  };
}

function derivedCount(derived: number, all: number): string {
  if (derived === 0) return all === 1 ? "an axiom" : "all of them axioms";
  if (derived < all) return `${derived} of them derived`;
  return all === 1 ? "derived" : "all of them derived";
}

function sourceText(obligation: ShownObligation, axioms: readonly Axiom[]): string {
  const { derivation } = obligation;
  if (derivation === null) {
    const [label] = usedLabels([obligation], axioms);
    return label === undefined ? "an axiom" : `axiom ${label}`;
  }
  const labels = derivation.premises.map(({ label }) => label);
  return labels.length === 0 ? "always true" : enumerate(labels);
}

const NUMBERS = ["no", "one", "two", "three", "four", "five", "six", "seven", "eight", "nine", "ten", "eleven", "twelve", "thirteen"]; // biome-ignore format: a list

const [x, y, z] = [letter("x"), letter("y"), letter("z")];

/** Writes the paragraph; the proofs in full stand at the types of `lib/logic/records/finiteness.ts`. */
class Paragraph {
  readonly #reason: FinitenessReason;
  /** `the axioms irr and trans`. */
  readonly #axioms: string;
  /** The name of the set that δ is true of; null when that is the whole domain. */
  readonly #set: Maths | null;
  readonly #phi: { readonly text: string; readonly latex: string };
  /** φ where it is just a relation of the theory, which then goes by its own name. */
  readonly #symbol: RelationSymbol | null;

  constructor(reason: FinitenessReason, labels: readonly string[]) {
    const { relation, domain, given } = reason;
    this.#reason = reason;
    this.#axioms =
      labels.length === 0 || labels.length > NAMED_AXIOMS
        ? "the axioms"
        : `${labels.length === 1 ? "axiom" : "the axioms"} ${enumerate(labels)}`;
    const taken = [relation, domain, ...(given === null ? [] : [given])]
      .flatMap((formula) => relationsOf(formula))
      .map(({ name }) => name);
    const set = firstFree(["D", "E", "U"], taken);
    this.#set = domain.kind === "true" ? null : letter(set);
    const phi = firstFree(["φ", "ψ", "χ"], taken);
    this.#phi = { text: phi, latex: { φ: "\\varphi", ψ: "\\psi", χ: "\\chi" }[phi]! };
    this.#symbol = relation.kind === "atom" && relation.args.join() === "x,y" ? relation.relation : null;
  }

  parts(): readonly Inline[] {
    const { record } = this.#reason;
    return words`${this.#setting(record)}${this.#argument(record)} So every model is infinite.`;
  }

  /** The parameters, the set and the relation that everything is said of. */
  #setting(record: PrincipleRecord): readonly Inline[] {
    const { principle } = record;
    const { parameters, given, domain, relation } = this.#reason;
    const parts: Inline[] = [];
    if (given !== null) {
      const names = enumerated(parameters.map((one) => termOf(one)));
      const [any, some, exist] =
        parameters.length === 1
          ? ["any element", "an element", "is one"]
          : ["any elements", "elements", "are such"];
      parts.push(
        ...(given.kind === "true"
          ? words`Let ${names} be ${any}. `
          : words`Let ${names} be ${some} with ${formulaOf(given)}; by the axioms there ${exist}. `),
      );
    }
    if (this.#set !== null)
      parts.push(...words`Let ${this.#set} be the set of all elements ${x} with ${formulaOf(domain)}. `);
    if (this.#symbol === null) {
      const phi = principle === "pairs" ? this.#related(x, y, z) : this.#related(x, y);
      parts.push(...words`Let ${phi} be ${formulaOf(relation)}. `);
    }
    const both = this.#set === null ? [] : words` and both are in ${this.#set}`;
    if (principle === "counting")
      parts.push(
        ...words`Call ${y} a successor of ${x}, and ${x} a predecessor of ${y}, when ${this.#related(x, y)}${record.everywhere ? [] : both}. `,
      );
    if (principle === "comprehension")
      parts.push(...words`Call ${x} a member of ${y} when ${this.#related(x, y)}${both}. `);
    return parts;
  }

  #argument(record: PrincipleRecord): readonly Inline[] {
    switch (record.principle) {
      case "endless-order":
        return this.#endlessOrder(record);
      case "counting":
        return this.#counting(record);
      case "pairs":
        return this.#pairs(record);
      case "comprehension":
        return this.#comprehension(record);
    }
  }

  #endlessOrder({ everywhere }: EndlessOrderRecord): readonly Inline[] {
    const again = this.#letter("abce");
    const on = this.#set === null || everywhere ? [] : words` on ${this.#set}`;
    return words`${this.#by()}${this.#notEmpty()}${this.#relationName()} is irreflexive and transitive${on}, and every element ${x}${this.#ofSet()} has some ${y}${this.#inSet()} with ${this.#related(x, y)}. Pass from any element${this.#ofSet()} to such a ${y}, from there to another, and so on. ${this.#ifFinite()} some element ${again} would be met twice, and then ${this.#related(again, again)} by transitivity, against irreflexivity.`;
  }

  #counting(record: CountingRecord): readonly Inline[] {
    const { successors: k, predecessors: j, spare, everywhere } = record;
    const of = this.#ofSet();
    // Otherwise successors and predecessors are in the set by what they are called so for.
    const there = everywhere ? this.#inSet() : [];
    const ofAny = everywhere ? [] : of;
    const most =
      j === 1
        ? words`no element${ofAny} has two predecessors`
        : words`every element${ofAny} has at most ${NUMBERS[j]!} predecessors`;
    const some =
      spare === "more-successors"
        ? `at least ${NUMBERS[k + 1]} successors`
        : k === 1
          ? "no predecessor"
          : `at most ${k === 2 ? "one predecessor" : `${NUMBERS[k - 1]} predecessors`}`;
    const every = words`every element${of} has ${k === 1 ? "a successor" : `at least ${NUMBERS[k]} successors`}${there}`;
    const conditions =
      spare === null
        ? words`${every}, and ${most}`
        : words`${every}, ${most}, and some element${of} has ${some}${there}`;
    const nonEmpty = spare === null ? this.#notEmpty() : [];
    const start = words`${this.#by()}${nonEmpty}${conditions}. ${this.#differences(record)}`;
    if (k === 1 && spare === "fewer-predecessors")
      return words`${start}Choose a successor${there} for each element${of}. No two elements have the same one, and some element is chosen for none: this is a one-to-one map of ${this.#domain()} into itself that is not onto, and a finite set has no such map.`;
    const n = this.#letter("nmp");
    const atLeast = spare === "more-successors" ? plusOne(times(k, n), "+") : times(k, n);
    const atMost = spare === "fewer-predecessors" ? plusOne(times(j, n), "−") : times(j, n);
    return words`${start}If ${this.#domain()} had just ${n} elements, counting the pairs of an element and a successor of it${there} by their first elements would give at least ${atLeast}, and by their second elements at most ${atMost}, which is impossible.`;
  }

  #pairs(record: PairsRecord): readonly Inline[] {
    const { pairs: j } = record;
    const n = this.#letter("nmp");
    const square = mathOf(`${n.text}²`, `${n.latex}^2`);
    const least = NUMBERS[j + 1]!;
    const bound = mathOf(`${n.text} ≤ ${j}`, `${n.latex} \\leq ${j}`);
    return words`${this.#by()}for all ${x} and ${y}${this.#inSet()} there is some ${z}${this.#inSet()} with ${this.#related(x, y, z)}, every ${z} is so related to at most ${j === 1 ? "one pair" : `${NUMBERS[j]} pairs`} of ${x} and ${y}, and there are at least ${least} elements${this.#inSet()}. ${this.#differences(record)}If ${this.#domain()} had just ${n} elements, there would be ${square} pairs, of which the ${n} elements serve at most ${times(j, n)}. So ${bound}, although there are at least ${least} elements.`;
  }

  #comprehension(record: ComprehensionRecord): readonly Inline[] {
    const of = this.#ofSet();
    return words`${this.#by()}some element${of} has no members, and for all ${x} and ${y}${this.#inSet()} there is an element${of} whose members are those of ${x} and ${y} itself. ${this.#differences(record)}${this.#ifFinite()} every set of elements${of} would be the set of members of some element, by adding one member after the other. Let the members of ${z} be just those elements${of} that are not members of themselves: then ${z} is a member of itself if and only if it is not.`;
  }

  /** By what elements are told apart, where that is not identity. */
  #differences({ different }: CountingRecord | PairsRecord | ComprehensionRecord): readonly Inline[] {
    if (different === "identity") return [];
    const [only] = different;
    const pair = (first: string, second: string) => mathOf(`(${first}, ${second})`, `(${first}, ${second})`);
    const how =
      different.length === 1 && only![1] === 2
        ? words`for some element ${z} it holds of just one of ${pair("x", "z")} and ${pair("y", "z")}, or of just one of ${pair("z", "x")} and ${pair("z", "y")}`
        : words`one of them cannot be put in the place of the other everywhere`;
    const names = different.map(([name]) => name);
    const tell = names.length === 1 ? `${names[0]} tells` : `${enumerate(names)} tell`;
    return words`Identity does not occur in the axioms, so elements ${x} and ${y} are different here when ${tell} them apart: when ${how}. Elements that are not told apart count as one in what follows; ${this.#relationName()} holds alike of them. `;
  }

  #by(): string {
    return `By ${this.#axioms}, `;
  }

  #notEmpty(): readonly Inline[] {
    return this.#set === null ? [] : words`${this.#set} is not empty, `;
  }

  #ofSet(): readonly Inline[] {
    return this.#set === null ? [] : words` of ${this.#set}`;
  }

  #inSet(): readonly Inline[] {
    return this.#set === null ? [] : words` in ${this.#set}`;
  }

  #ifFinite(): readonly Inline[] {
    return this.#set === null ? ["In a finite domain"] : words`If ${this.#set} were finite,`;
  }

  #domain(): Inline {
    return this.#set ?? "the domain";
  }

  #relationName(): Inline {
    if (this.#symbol === null) return mathOf(this.#phi.text, this.#phi.latex);
    return { kind: "relation", name: this.#symbol.name };
  }

  #related(...args: readonly Maths[]): Inline {
    const names = args.map(({ text }) => text);
    if (this.#symbol !== null) return formulaOf(atom(this.#symbol, ...names));
    return mathOf(`${this.#phi.text}(${names.join(", ")})`, `${this.#phi.latex}(${names.join(", ")})`);
  }

  /** A letter that is none of the parameters. */
  #letter(letters: string): Maths {
    return letter(firstFree([...letters], this.#reason.parameters));
  }
}

function firstFree(names: readonly string[], taken: readonly string[]): string {
  return names.find((name) => !taken.includes(name)) ?? names[0]!;
}

function letter(name: string): Maths {
  return mathOf(name, name);
}

function times(count: number, { text, latex }: Maths): Maths {
  return count === 1 ? mathOf(text, latex) : mathOf(`${count}${text}`, `${count}${latex}`);
}

function plusOne({ text, latex }: Maths, sign: "+" | "−"): Maths {
  return mathOf(`${text} ${sign} 1`, `${latex} ${sign === "−" ? "-" : "+"} 1`);
}
