/** Answers as they are shown: the line of the verdict, what was asked, and the structures that it rests on. */

import type {
  Answer,
  AxiomAnswer,
  ClaimAnswer,
  CompareAnswer,
  DualAnswer,
  FiniteAnswer,
  IndependenceAnswer,
  MinimiseAnswer,
} from "../../lib/inquiry/answer.ts";
import { DEFAULT_LARGEST_SIZE } from "../../lib/inquiry/work.ts";
import type { Claim, NamedTheory, Statement } from "../../lib/language/statements.ts";
import { type Formula, usesIdentity } from "../../lib/logic/formula.ts";
import { sentencesOf } from "../../lib/logic/theory.ts";
import type { MimeBundle } from "../session/evaluator.ts";
import { type Block, code, type Inline, leadingVerdict, line, note, verdict } from "./blocks.ts";
import { renderBundle } from "./bundle.ts";
import { countBlocks } from "./counts.ts";
import { showDerivation, showDerivations } from "./derivations.ts";
import { numberedStructures } from "./galleries.ts";
import { reasonBlocks } from "./reasons.ts";
import { drawStrength } from "./strength.ts";
import { definitionBlocks, domainOf, structureBlocks } from "./structures.ts";
import {
  axiomsAsked,
  budgetOf,
  claimOf,
  derivedText,
  endText,
  pairReason,
  reportText,
  summarise,
} from "./summaries.ts";
import { counted, onSizesTo } from "./text.ts";
import { theoryTable } from "./theories.ts";

/** Structures that stand open below an answer; the rest are folded. */
const OPEN_STRUCTURES = 4;

/** What is displayed for a statement, and the one line for `eval` and the ledger. */
export interface Shown {
  readonly summary: string;
  readonly data: MimeBundle;
}

/** An answer as a display. {@link prepareDrawing} must have been awaited. */
export function showAnswer(statement: Statement, answer: Answer): Shown {
  const summary = summarise(statement, answer);
  const blocks: Block[] = [line(...verdictLine(summary, answer)), line(...questionOf(statement))];
  if (isWithoutIdentity(statement))
    blocks.push(note("Asked without identity: = does not occur in these sentences."));
  blocks.push(...detailsOf(statement, answer));
  return { summary, data: renderBundle(blocks, "with-latex") };
}

/** The summary with the verdict set apart, where there is one verdict. */
function verdictLine(summary: string, answer: Answer): readonly Inline[] {
  const word = answer.verdict;
  if (word === null || !summary.startsWith(`${word}:`)) return [summary];
  return [leadingVerdict(word), summary.slice(word.length + 2)];
}

/** What was asked, as the user wrote it. */
function questionOf(statement: Statement): readonly Inline[] {
  return [code(statement.text.replace(/\s+/g, " "))];
}

function isWithoutIdentity(statement: Statement): boolean {
  const asked = sentencesAsked(statement);
  return asked.length > 0 && !asked.some(usesIdentity);
}

/** All sentences that a question puts to theories; for truth in a given structure there is no question of identity. */
function sentencesAsked(statement: Statement): readonly Formula[] {
  const ofTheories = (...theories: readonly NamedTheory[]) =>
    theories.flatMap(({ theory }) => sentencesOf(theory));
  switch (statement.kind) {
    case "check-finite":
    case "independence":
    case "minimise":
    case "models":
    case "count":
    case "dualise":
      return ofTheories(statement.theory);
    case "compare":
      return ofTheories(...statement.theories);
    default: {
      const claim = claimOf(statement);
      return claim === null ? [] : sentencesClaimed(claim);
    }
  }
}

function sentencesClaimed(claim: Claim): readonly Formula[] {
  switch (claim.kind) {
    case "entails":
    case "does-not-entail":
      return [...sentencesOf(claim.premises.theory), claim.conclusion.formula];
    case "true-in":
    case "false-in":
      return [];
    case "weaker":
    case "equivalent":
      return [...sentencesOf(claim.left.theory), ...sentencesOf(claim.right.theory)];
    default:
      return sentencesOf(claim.theory.theory);
  }
}

function detailsOf(statement: Statement, answer: Answer): readonly Block[] {
  switch (answer.question) {
    case "claim":
      return claimBlocks(answer);
    case "check-finite":
      return [
        ...(answer.derivation === null ? [] : showDerivation(answer.derivation)),
        ...(answer.model === null ? [] : structureBlocks("model", answer.model)),
        ...noFiniteBlocks(answer),
      ];
    case "models":
      return numberedStructures("model", answer.models);
    case "count":
      return countBlocks(answer, budgetOf(statement));
    case "independence":
      return axiomsBlocks(answer, answer.axioms, statement);
    case "compare":
      return compareBlocks(answer, statement);
    case "minimise":
      return minimalBlocks(answer);
    case "dualise":
      return dualBlocks(answer, statement);
  }
  function noFiniteBlocks({ noFinite }: ClaimAnswer | FiniteAnswer): readonly Block[] {
    return noFinite === null ? [] : reasonBlocks(noFinite, axiomsAsked(statement));
  }
  function claimBlocks(claim: ClaimAnswer): readonly Block[] {
    if (claim.axioms !== null) return axiomsBlocks(claim, claim.axioms, statement);
    const asked = claimOf(statement);
    // The reader knows the structure: it has been defined, and often several claims about it follow each other.
    if ((asked?.kind === "true-in" || asked?.kind === "false-in") && claim.structures.length > 0)
      return [
        {
          kind: "fold",
          title: "The structure",
          blocks: definitionBlocks("structure", asked.structure.structure),
        },
      ];
    return [
      ...showDerivations(claim.derivations),
      ...foldRest(claim.structures.map(({ role, structure }) => structureBlocks(role, structure))),
      ...noFiniteBlocks(claim),
    ];
  }
}

/** The first few open, the rest folded. */
function foldRest(groups: readonly (readonly Block[])[]): readonly Block[] {
  const rest = groups.slice(OPEN_STRUCTURES);
  const blocks = groups.slice(0, OPEN_STRUCTURES).flat();
  if (rest.length > 0)
    blocks.push({ kind: "fold", title: `${counted(rest.length, "more structure")}`, blocks: rest.flat() });
  return blocks;
}

function axiomsBlocks(
  answer: ClaimAnswer | IndependenceAnswer,
  axioms: readonly AxiomAnswer[],
  statement: Statement,
): readonly Block[] {
  if (axioms.length === 0) return [];
  const share = Math.max(1, Math.floor(budgetOf(statement) / axioms.length));
  const checked = answer.evidence === null ? "" : " (checked)";
  const table: Block = {
    kind: "table",
    caption: null,
    head: ["axiom", "verdict", "on what evidence"],
    rows: axioms.map((axiom) => [
      [axiom.label],
      [verdict(axiom.verdict)],
      [axiomReason(axiom, checked, share)],
    ]),
    look: "prose",
  };
  const witnesses = axioms.flatMap(({ label, witness }) =>
    witness === null ? [] : structureBlocks(`only ${label} fails`, witness),
  );
  const derivations = axioms.flatMap(({ derivation }) => (derivation === null ? [] : [derivation]));
  return [
    table,
    ...showDerivations(derivations),
    ...(witnesses.length === 0
      ? []
      : [{ kind: "fold", title: "The structures", blocks: witnesses } as const]),
  ];
}

function minimalBlocks(answer: MinimiseAnswer): readonly Block[] {
  if (answer.sets.length === 0) return [];
  const table: Block = {
    kind: "table",
    caption: null,
    head: ["set", "axioms", "the others"],
    rows: answer.sets.map(({ labels, derivations }, index) => [
      [`${index + 1}`],
      [labels.length === 0 ? "none" : labels.join(", ")],
      [derivations.length === 0 ? "there are none" : derivedText(derivations)],
    ]),
    look: "prose",
  };
  const derivations = answer.sets.flatMap((set) => set.derivations);
  const structures = answer.sets.flatMap(({ labels, witnesses }) =>
    witnesses.flatMap((structure, place) =>
      structureBlocks(`of ${labels.join(", ")} only ${labels[place]} fails`, structure),
    ),
  );
  const blocks: Block[] = [table, ...showDerivations(derivations)];
  if (structures.length > 0) blocks.push({ kind: "fold", title: "The structures", blocks: structures });
  return blocks;
}

function axiomReason(axiom: AxiomAnswer, checked: string, share: number): string {
  if (axiom.witness !== null) return `fails alone on ${domainOf(axiom.witness)}${checked}`;
  const { search, derivation } = axiom;
  if (derivation !== null) return `${derivedText([derivation])}${checked}`;
  if (axiom.verdict === "redundant") return `the same as another axiom${checked}`;
  const none = search.noneUpTo > 0 ? `no such structure ${onSizesTo(search.noneUpTo)}` : "";
  const end = search.ended === null ? "" : endText(search.ended, share, search.endedAt);
  return [reportText(axiom.report), none, end].filter(Boolean).join("; ");
}

function compareBlocks(answer: CompareAnswer, statement: Statement): readonly Block[] {
  const checked = answer.evidence === null ? "" : " (checked)";
  const table: Block = {
    kind: "table",
    caption: null,
    head: ["left", "verdict", "right", "on what evidence"],
    rows: answer.pairs.map((pair) => [
      [code(answer.names[pair.left]!)],
      [verdict(pair.verdict)],
      [code(answer.names[pair.right]!)],
      [
        `${pairReason(pair, answer.names, checked)}; ${commonText(pair.jointlyInconsistent, pair.common, checked)}`,
      ],
    ]),
    look: "prose",
  };
  const classes = answer.classes.filter((names) => names.length > 1);
  const equivalent = classes.map((names) =>
    line("equivalent: ", ...names.flatMap((name, i) => [i === 0 ? "" : ", ", code(name)])),
  );
  const picture = drawStrength(answer);
  const diagram = picture === null ? [] : [picture];
  const inconsistent = answer.inconsistent.map(({ name }) =>
    note(code(name), " is inconsistent: everything follows from it."),
  );
  const derivations = [
    ...answer.inconsistent.map(({ derivation }) => derivation),
    ...answer.pairs.flatMap((pair) => pair.derivations),
  ];
  const structures = answer.pairs.flatMap((pair): readonly Block[] => {
    const [left, right] = [answer.names[pair.left]!, answer.names[pair.right]!];
    return [
      ...(pair.leftOnly === null ? [] : structureBlocks(`model of ${left}, not of ${right}`, pair.leftOnly)),
      ...(pair.rightOnly === null
        ? []
        : structureBlocks(`model of ${right}, not of ${left}`, pair.rightOnly)),
      ...(pair.common === null ? [] : structureBlocks(`model of both ${left} and ${right}`, pair.common)),
    ];
  });
  const blocks: Block[] = [
    ...inconsistent,
    ...diagram,
    table,
    ...equivalent,
    ...interruptedNote(answer.interrupted),
  ];
  if (derivations.length > 0)
    blocks.push({ kind: "fold", title: "The derivations", blocks: showDerivations(derivations) });
  const isOpen = answer.pairs.some(({ verdict: word }) => word === "open");
  if (isOpen) blocks.push(rangeNote(statement));
  if (structures.length > 0) blocks.push({ kind: "fold", title: "The structures", blocks: structures });
  return blocks;
}

function commonText(
  isInconsistent: boolean | null,
  common: CompareAnswer["pairs"][number]["common"],
  checked: string,
): string {
  if (common !== null) return `a common model on ${domainOf(common)}${checked}`;
  return isInconsistent === true ? `no common model${checked}` : "no common model found";
}

/** How far the searches of a comparison could go: where one ended is not told, so no size is claimed to be empty. */
function rangeNote(statement: Statement): Block {
  const options = "options" in statement ? statement.options : null;
  const upTo = options?.upTo ?? DEFAULT_LARGEST_SIZE;
  return note(
    `Open: structures ${onSizesTo(upTo)} were to be searched, within ${counted(budgetOf(statement), "step")} for the whole question.`,
  );
}

function interruptedNote(isInterrupted: boolean): readonly Block[] {
  return isInterrupted ? [note("Interrupted: pairs that had not been reached are open.")] : [];
}

function dualBlocks(answer: DualAnswer, statement: Statement): readonly Block[] {
  const checked = answer.evidence === null ? "" : " (checked)";
  const name = (index: number) => answer.duals[index]!.name;
  const table: Block = {
    kind: "table",
    caption: null,
    head: ["left", "verdict", "right", "on what evidence"],
    rows: answer.pairs.map(({ left, right, verdict: word, witness }) => [
      [code(name(left))],
      [verdict(word)],
      [code(name(right))],
      [
        witness === null
          ? word === "open"
            ? "no structure found that tells them apart"
            : `each follows from the other${checked}`
          : `a model of ${name(witness.modelOf)} on ${domainOf(witness.structure)} is none of ${name(witness.modelOf === left ? right : left)}${checked}`,
      ],
    ]),
    look: "prose",
  };
  const blocks: Block[] = [table, ...interruptedNote(answer.interrupted)];
  if (answer.pairs.some(({ verdict: word }) => word === "open")) blocks.push(rangeNote(statement));
  const derivations = answer.pairs.flatMap((pair) => pair.derivations);
  if (derivations.length > 0)
    blocks.push({ kind: "fold", title: "The derivations", blocks: showDerivations(derivations) });
  const duals = answer.duals.slice(1).map(({ name: title, theory }) => theoryTable(title, theory));
  blocks.push({ kind: "fold", title: "The duals", blocks: duals });
  const structures = answer.pairs.flatMap(({ left, right, witness }) =>
    witness === null
      ? []
      : structureBlocks(
          `model of ${name(witness.modelOf)}, not of ${name(witness.modelOf === left ? right : left)}`,
          witness.structure,
        ),
  );
  if (structures.length > 0) blocks.push({ kind: "fold", title: "The structures", blocks: structures });
  return blocks;
}
