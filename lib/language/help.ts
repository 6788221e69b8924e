/**
 * What the statements and their parts mean, in one place for the parser's messages, completion and inspection.
 */
import type { NormalFormName } from "../logic/normal-forms/result.ts";
import type { StatementKind } from "./statements.ts";

export interface NormalFormHelp {
  readonly name: NormalFormName;
  /** The words after `to`, before `form`. */
  readonly phrase: readonly string[];
  /** One sentence. */
  readonly meaning: string;
}

export const normalFormHelp: readonly NormalFormHelp[] = [
  { name: "negation", phrase: ["negation"], meaning: "Without → and ↔, and ¬ only before atoms." },
  { name: "prenex", phrase: ["prenex"], meaning: "All quantifiers in front." },
  { name: "miniscoped", phrase: ["miniscoped"], meaning: "Quantifiers as far inside as they go." },
  {
    name: "skolem",
    phrase: ["Skolem"],
    meaning: "Prenex, without ∃: Skolem functions stand for its witnesses. Equisatisfiable.",
  },
  { name: "clause", phrase: ["clause"], meaning: "A set of clauses, Skolemised. Equisatisfiable." },
  {
    name: "definitional-clause",
    phrase: ["definitional", "clause"],
    meaning:
      "A set of clauses with new relations for subformulas, so that it does not grow. Equisatisfiable.",
  },
  {
    name: "disjunctive",
    phrase: ["disjunctive"],
    meaning: "A disjunction of conjunctions behind the quantifiers.",
  },
];

function listForms(): string {
  return listWords(
    normalFormHelp.map(({ phrase }) => phrase.join(" ")),
    "or",
  );
}

export interface StatementHelp {
  readonly word: StatementKind;
  /** How it is written. */
  readonly form: string;
  /** One sentence. */
  readonly meaning: string;
  /** Whether `up to …` and `within … steps` may follow. */
  readonly options: boolean;
}

export const statementHelp: readonly StatementHelp[] = [
  {
    word: "relation",
    form: "relation R, Between of 3 places, ≺ infix",
    meaning: "Declares relations; they have two places unless it says otherwise.",
    options: false,
  },
  {
    word: "define",
    form: "define Name := theory, structure or sentence; define Name(x, y) := formula",
    meaning: "Gives a name to a theory, a structure, a sentence or a formula with parameters.",
    options: false,
  },
  {
    word: "describe",
    form: "describe X",
    meaning: "Prints a theory, structure, formula or relation with what is known of its form.",
    options: false,
  },
  {
    word: "derive",
    form: "derive T ⊨ φ",
    meaning: "Asks whether the theory entails the sentence: a derivation or a countermodel.",
    options: true,
  },
  {
    word: "claim",
    form: "claim T ⊨ φ, claim T is consistent, …",
    meaning: "States something that must be established; the cell fails if it is not.",
    options: true,
  },
  {
    word: "conjecture",
    form: "conjecture T ⊨ φ, conjecture T is consistent, …",
    meaning: "States something that is recorded as established, refuted or open, and fails nothing.",
    options: true,
  },
  {
    word: "check-finite",
    form: "check-finite T",
    meaning: "Asks whether the theory has finite models, none at all, or only infinite ones.",
    options: true,
  },
  {
    word: "dualise",
    form: "dualise T",
    meaning: "Forms the converse, the complement and both, and says which of the four are equivalent.",
    options: true,
  },
  {
    word: "compare",
    form: "compare T, U, …",
    meaning: "Orders theories by strength.",
    options: true,
  },
  {
    word: "independence",
    form: "independence T",
    meaning: "Asks of each axiom whether it follows from the others.",
    options: true,
  },
  {
    word: "minimise",
    form: "minimise T",
    meaning: "Lists the sets of axioms from which the others follow and in which none is redundant.",
    options: true,
  },
  {
    word: "models",
    form: "models T of size n",
    meaning: "Shows the models on n points, up to isomorphism.",
    options: true,
  },
  {
    word: "count",
    form: "count T up to n with representatives",
    meaning: "Counts the models on 1 to n points, labelled and up to isomorphism.",
    options: true,
  },
  {
    word: "normalise",
    form: "normalise φ to prenex form with steps",
    meaning: `Brings a formula into a normal form: ${listForms()}.`,
    options: false,
  },
  {
    word: "write",
    form: "write T as SMT-LIB, write T ⊨ φ as SMT-LIB, write A ⊨ φ as SMT-LIB, write T ⊨ φ as DIMACS of size n",
    meaning:
      "Prints a theory, a question or what is true in a structure over numbers for other programs, in an open standard.",
    options: false,
  },
];

const byWord = new Map<string, StatementHelp>(statementHelp.map((help) => [help.word, help]));

/** The help of a statement word; undefined for other words. */
export function helpOf(word: string): StatementHelp | undefined {
  return byWord.get(word);
}

/** Statement words that are planned and not in this version, so that they are refused by name. */
export const laterStatements: readonly string[] = [
  "weaken",
  "negate",
  "completeness",
  "explore",
  "place",
  "ledger",
];

/** What a claim can say after `T` or a structure `A`. */
export interface ClaimForm {
  /** The words after the subject. */
  readonly phrase: readonly string[];
  readonly form: string;
  readonly meaning: string;
}

export const claimForms: readonly ClaimForm[] = [
  {
    phrase: ["⊨"],
    form: "T ⊨ φ, A ⊨ φ",
    meaning: "Every model of T makes the sentence true; the structure A does.",
  },
  {
    phrase: ["⊭"],
    form: "T ⊭ φ, A ⊭ φ",
    meaning: "Some model of T makes the sentence false; the structure A does.",
  },
  { phrase: ["is", "consistent"], form: "T is consistent", meaning: "The theory has a model." },
  {
    phrase: ["is", "infinite-only"],
    form: "T is infinite-only",
    meaning: "The theory has models, all of them infinite.",
  },
  {
    phrase: ["has", "no", "finite", "model"],
    form: "T has no finite model",
    meaning: "No finite structure is a model of the theory.",
  },
  {
    phrase: ["is", "independent"],
    form: "T is independent",
    meaning: "No axiom follows from the others.",
  },
  {
    phrase: ["is", "weaker", "than"],
    form: "T is weaker than U",
    meaning: "U entails T, and T does not entail U.",
  },
  {
    phrase: ["is", "equivalent", "to"],
    form: "T is equivalent to U",
    meaning: "T and U have the same models.",
  },
];

export interface OptionHelp {
  readonly word: string;
  readonly form: string;
  readonly meaning: string;
}

export const optionHelp: readonly OptionHelp[] = [
  { word: "up", form: "up to n", meaning: "The largest number of points that is tried." },
  { word: "within", form: "within n steps", meaning: "The budget of the question, in steps." },
];

/** Words in a row, as in "a, b and c". */
export function listWords(words: readonly string[], last: "and" | "or" = "and"): string {
  if (words.length <= 1) return words.join("");
  return `${words.slice(0, -1).join(", ")} ${last} ${words.at(-1)!}`;
}

/** All statement words, quoted, for messages. */
export function statementList(): string {
  return listWords(statementHelp.map((help) => `\`${help.word}\``));
}
