/**
 * The one line that says what was established, and on what evidence. It never says more than was shown: sizes that a
 * search finished are named as such, an ended budget is named with the size it ended at, and `(checked)` stands only
 * where the checker accepted the evidence.
 */

import { sizeOf } from "../../lib/carriers/any-structure.ts";
import type {
  Answer,
  AxiomAnswer,
  ClaimAnswer,
  CompareAnswer,
  CountAnswer,
  CountedSize,
  DerivationReport,
  DualAnswer,
  FiniteAnswer,
  IndependenceAnswer,
  MinimiseAnswer,
  ModelsAnswer,
  PairAnswer,
  Search,
  ShownDerivation,
} from "../../lib/inquiry/answer.ts";
import { CARRIERS } from "../../lib/inquiry/carrier-list.ts";
import type { Claim, Statement } from "../../lib/language/statements.ts";
import { depthOf } from "../../lib/logic/formula.ts";
import { DEFAULT_BUDGET, type EndReason } from "../../lib/logic/meter.ts";
import type { Axiom } from "../../lib/logic/theory.ts";
import { reasonSource } from "./reasons.ts";
import { domainOf, domainOfDefinition } from "./structures.ts";
import { counted, enumerate, grouped, onSizesTo, withArticle } from "./text.ts";

/** The budget that a statement was run with, in steps. */
export function budgetOf(statement: Statement): number {
  return "options" in statement ? (statement.options.within ?? DEFAULT_BUDGET) : DEFAULT_BUDGET;
}

export function summarise(statement: Statement, answer: Answer): string {
  const budget = budgetOf(statement);
  switch (answer.question) {
    case "claim":
      return `${answer.verdict}: ${claimReason(statement, answer, budget)}`;
    case "check-finite":
      return `${answer.verdict}: ${finiteReason(statement, answer, budget)}`;
    case "models":
      return modelsSummary(answer, budget);
    case "count":
      return countSummary(answer, budget);
    case "independence":
      return independenceSummary(answer);
    case "compare":
      return compareSummary(answer);
    case "minimise":
      return minimiseSummary(answer, budget);
    case "dualise":
      return dualSummary(answer);
  }
}

/** The claim that a statement makes; `derive` makes that of entailment. */
export function claimOf(statement: Statement): Claim | null {
  if (statement.kind === "claim" || statement.kind === "conjecture") return statement.claim;
  if (statement.kind === "derive")
    return { kind: "entails", premises: statement.premises, conclusion: statement.conclusion };
  return null;
}

function claimReason(statement: Statement, answer: ClaimAnswer, budget: number): string {
  const checked = answer.evidence === null ? "" : " (checked)";
  const claim = claimOf(statement);
  if (claim?.kind === "independent" && answer.axioms !== null)
    return axiomsReason(answer.axioms, answer.evidence !== null);
  const found = enumerate(
    answer.structures.map(({ role, structure }) => `${withArticle(role)} on ${domainOf(structure)}`),
  );
  if (answer.verdict === "open") {
    const [deep] = answer.searches.flatMap(({ configurations }) => configurations ?? []);
    if (deep !== undefined && (claim?.kind === "true-in" || claim?.kind === "false-in"))
      return depthReason(claim, deep, answer.searches[0]!, budget);
    const open = answer.searches.flatMap((search, place) => {
      const report = answer.reports[place];
      return search.foundAt !== null || report?.result === "derived"
        ? []
        : [openText(search, report ?? null, budget, answer.steps)];
    });
    const noFinite =
      answer.noFinite === null ? [] : [`no finite model, ${noFiniteSource(statement, answer)}`];
    const reasons = [...(found === "" ? [] : [`${found}${checked}`]), ...noFinite, ...open];
    return reasons.length === 0 ? `${stepsText(answer.steps, budget)} spent` : reasons.join("; ");
  }
  if (claim?.kind === "true-in" || claim?.kind === "false-in")
    return `evaluated in ${claim.structure.text}, ${domainOfDefinition(claim.structure.structure)}${checked}`;
  if (answer.inconsistent) return `${inconsistencyText(claim)}${checked}`;
  if (answer.noFinite !== null) {
    const reason = noFiniteSource(statement, answer);
    return found === ""
      ? `no finite model, ${reason}${checked}`
      : `${found}; no finite one, ${reason}${checked}`;
  }
  if (answer.derivations.length > 0 || found === "") {
    const derived = answer.derivations.length > 0 ? derivedText(answer.derivations) : memberText(claim);
    return found === "" ? `${derived}${checked}` : `${derived}; ${found}${checked}`;
  }
  return `${found}${checked}${fewerText(answer)}`;
}

/** Configurations of which more are told by a power of ten alone. */
const MOST_TOLD = 1e15;

/** Why a sentence about an infinite structure was not decided. */
function depthReason(
  claim: Claim & { readonly kind: "true-in" | "false-in" },
  configurations: number,
  { ended }: Search,
  budget: number,
): string {
  const count =
    configurations > MOST_TOLD
      ? "more than 10^15 configurations"
      : `up to ${counted(configurations, "configuration")}`;
  const depth = depthOf(claim.sentence.formula);
  const end = ended === "budget" || ended === "interrupted" ? `; ${endText(ended, budget, null)}` : "";
  return `a sentence of depth ${depth} is too deep for ${domainOfDefinition(claim.structure.structure)}: to list all cases would take ${count}${end}`;
}

/** What the reason that there is no finite model rests on: `by irr and trans`. */
function noFiniteSource(statement: Statement, { noFinite }: ClaimAnswer | FiniteAnswer): string {
  return reasonSource(noFinite!, axiomsAsked(statement));
}

/** The axioms of the theory that a question about finite models asks about. */
export function axiomsAsked(statement: Statement): readonly Axiom[] {
  if (statement.kind === "check-finite") return statement.theory.theory.axioms;
  const claim = claimOf(statement);
  return claim !== null && "theory" in claim ? claim.theory.theory.axioms : [];
}

/** What an inconsistent theory means for a claim. */
function inconsistencyText(claim: Claim | null): string {
  switch (claim?.kind) {
    case "entails":
    case "does-not-entail":
      return "the premises are inconsistent, and everything follows from them";
    case "weaker":
    case "equivalent":
      return "one of the theories is inconsistent, and everything follows from it";
    default:
      return "the axioms are inconsistent: there is no model at all";
  }
}

/** What holds without any derivation: what is to follow stands among the axioms, or there is nothing to follow. */
function memberText(claim: Claim | null): string {
  return claim?.kind === "entails" || claim?.kind === "does-not-entail"
    ? "the conclusion is one of the premises"
    : "the axioms of the one are among those of the other";
}

/** What was derived, from which axioms: `derived from irr and trans`. */
export function derivedText(derivations: readonly ShownDerivation[]): string {
  const labels = [...new Set(derivations.flatMap(({ premises }) => premises.map(({ label }) => label)))];
  return labels.length === 0 ? "follows from no axioms at all" : `derived from ${enumerate(labels)}`;
}

/** How far both searches came without settling anything. */
function openText(search: Search, report: DerivationReport | null, budget: number, steps: number): string {
  // Whatever was being done when the user interrupted, that is why it ended.
  const isInterrupted = report?.ended === "interrupted" && search.ended !== "interrupted";
  const ended = isInterrupted ? { ...search, ended: "interrupted" as const, endedAt: null } : search;
  return [reportText(report), searchText(ended, budget, steps)].filter(Boolean).join("; ");
}

/** `no derivation among 12,345 clauses`; empty when none was looked for. */
export function reportText(report: DerivationReport | null): string {
  if (report === null || report.result === "derived") return "";
  if (report.result === "saturated")
    return "there is no derivation (all that follows was computed, not certified)";
  const memory = report.ended === "memory" ? ", where the bound on memory was met" : "";
  return report.generated === 0 ? "" : `no derivation among ${counted(report.generated, "clause")}${memory}`;
}

/** That the structure found is a smallest one, where the search went through all smaller sizes; else how far it went. */
function fewerText({ searches, structures }: ClaimAnswer): string {
  const [search] = searches;
  if (searches.length !== 1 || search === undefined || search.foundAt === 1) return "";
  if (search.foundAt === null && structures.every(({ structure }) => sizeOf(structure) !== null)) return "";
  if (search.foundAt !== null && search.noneUpTo === search.foundAt - 1)
    return "; none on fewer (complete search)";
  return search.noneUpTo > 0 ? `; none ${onSizesTo(search.noneUpTo)} (complete search)` : "";
}

/** What a search without a find has shown: `no countermodel on 1 to 8 points; 12,345 of 200,000 steps`. */
export function searchText(search: Search, budget: number, steps: number): string {
  const symmetric =
    search.symmetricUpTo === null
      ? ""
      : `; none met among symmetric ones up to ${grouped(search.symmetricUpTo)}`;
  const finite =
    search.noneUpTo > 0 ? `no ${bare(search.sought)} ${onSizesTo(search.noneUpTo)}${symmetric}` : "";
  const none = [finite, carriersText(search, finite === "")].filter(Boolean).join("; ");
  if (search.ended === null)
    return none === "" ? `no size was searched for ${search.sought}` : `${none}; ${stepsText(steps, budget)}`;
  const end = endText(search.ended, budget, search.endedAt);
  return none === "" ? `looking for ${search.sought}, ${end}` : `${none}; ${end}`;
}

/** How many infinite carriers have no such structure: `none on 12 of 57 infinite carriers`. */
function carriersText({ sought, noneOnCarriers }: Search, isFirst = false): string {
  if (noneOnCarriers === 0) return "";
  const none = isFirst ? `no ${bare(sought)}` : "none";
  return `${none} on ${noneOnCarriers} of ${counted(CARRIERS.length, "infinite carrier")}`;
}

/** Why work ended, and at which size. */
export function endText(reason: EndReason, budget: number, size: number | null): string {
  const at = size === null ? "" : ` at ${counted(size, "point")}`;
  switch (reason) {
    case "budget":
      return `the budget of ${counted(budget, "step")} ended${at}`;
    case "interrupted":
      return `interrupted${at}`;
    case "memory":
      return `the bound on memory was met${at}`;
  }
}

function stepsText(steps: number, budget: number): string {
  return `${grouped(steps)} of ${counted(budget, "step")}`;
}

/** `a countermodel` without its article. */
function bare(sought: string): string {
  return sought.replace(/^an? /, "");
}

function finiteReason(statement: Statement, answer: FiniteAnswer, budget: number): string {
  const checked = answer.evidence === null ? "" : " (checked)";
  const { search, report, model, steps } = answer;
  const found = model === null ? "a model" : `a model on ${domainOf(model)}`;
  switch (answer.verdict) {
    case "finite": {
      if (answer.leastSize === 1) return `a model on 1 point${checked}`;
      if (answer.leastSize !== null)
        return `a smallest model has ${counted(answer.leastSize, "point")}${checked}${smallerText(answer)}`;
      return `${found}${checked}${smallerText(answer)}; whether it is a smallest one is open`;
    }
    case "infinite-only":
      return `${found}; no finite one, ${noFiniteSource(statement, answer)}${checked}`;
    case "inconsistent":
      return `${answer.derivation === null ? "no model" : `a contradiction, ${derivedText([answer.derivation])}`}${checked}`;
    case "no-finite-model": {
      const tried = [reportText(report), carriersText(search, true), endOf(search, budget, steps)];
      return `no finite model, ${noFiniteSource(statement, answer)}${checked}; whether there is an infinite one is open: ${tried.filter(Boolean).join("; ")}`;
    }
    case "consistent":
      return `${found}${checked}; whether there is a finite one is open: ${searchText({ ...search, noneOnCarriers: 0 }, budget, steps)}`;
    case "open":
      return openText(search, report, budget, steps);
  }
}

/** What work there was, where it ended. */
function endOf({ ended }: Search, budget: number, steps: number): string {
  return ended === null ? stepsText(steps, budget) : endText(ended, budget, null);
}

/** What is known of the sizes below that of the model: proofs that the checker accepted, or a search alone. */
function smallerText({ noModelUpTo, provenUpTo, evidence }: FiniteAnswer): string {
  if (noModelUpTo === 0) return "";
  const none = `; none ${onSizesTo(noModelUpTo)}`;
  if (evidence !== null && provenUpTo >= noModelUpTo) return `${none} (clause proofs, checked)`;
  return provenUpTo === 0
    ? `${none} (complete search)`
    : `${none} (complete search; clause proofs ${onSizesTo(provenUpTo)})`;
}

function modelsSummary(answer: ModelsAnswer, budget: number): string {
  const { models, size, complete, more, ended } = answer;
  const points = counted(size, "point");
  const end = more
    ? "there are others"
    : ended === null
      ? "the search was not finished"
      : endText(ended, budget, null);
  if (models.length === 0)
    return complete
      ? `no model on ${points} (${answer.provenNone && answer.evidence !== null ? "clause proof, checked" : "complete search"})`
      : `no model found on ${points}; ${end}`;
  const checked = answer.evidence === null ? "" : models.length === 1 ? ", checked" : ", each checked";
  const found = `${counted(models.length, "model")} on ${points} up to isomorphism${checked}`;
  return complete ? `${found}; no others (complete search)` : `at least ${found}; ${end}`;
}

function countSummary(answer: CountAnswer, budget: number): string {
  const { sizes, ended, endedAt } = answer;
  const end = ended === null ? "" : `; ${endText(ended, budget, endedAt)}`;
  const last = sizes.at(-1);
  if (last === undefined) return `no size was counted${end}`;
  const { labelled, unlabelled } = last;
  const on = ` on ${counted(last.size, "point")}`;
  const parts = [
    ...(labelled === null ? [] : [`${counted(labelled, "labelled model")}${on}`]),
    ...(unlabelled === null
      ? []
      : [`${grouped(unlabelled)} up to isomorphism${labelled === null ? on : ""}`]),
  ];
  const models = labelled === 0n || unlabelled === 0n ? `no model${on}` : parts.join(", ");
  const finished = finishedSizes(sizes);
  const range = finished === "" ? "" : `; ${finished} counted`;
  return `${models}${range}${end} (computed, not certified)`;
}

/** The sizes of which both numbers are finished: `1 to 4 points`; empty when there are none. */
export function finishedSizes(sizes: readonly CountedSize[]): string {
  const finished = sizes.filter(({ labelled, unlabelled }) => labelled !== null && unlabelled !== null);
  const last = finished.at(-1)?.size;
  if (last === undefined) return "";
  return last === 1 ? "1 point" : `1 to ${grouped(last)} points`;
}

function independenceSummary(answer: IndependenceAnswer): string {
  return axiomsReason(answer.axioms, answer.evidence !== null);
}

/** How many axioms of how many, and which are not independent. */
function axiomsReason(axioms: readonly AxiomAnswer[], isChecked: boolean): string {
  if (axioms.length === 0) return "there are no axioms";
  const checked = isChecked ? " (checked)" : "";
  const labelled = (verdict: AxiomAnswer["verdict"]) =>
    axioms.filter((axiom) => axiom.verdict === verdict).map((axiom) => axiom.label);
  const [independent, redundant, open] = [labelled("independent"), labelled("redundant"), labelled("open")];
  if (independent.length === axioms.length)
    return axioms.length === 1
      ? `the one axiom fails in a structure${checked}`
      : `each of ${axioms.length} axioms fails alone in a structure where the others hold${checked}`;
  const parts = [
    `${independent.length} of ${counted(axioms.length, "axiom")} independent${independent.length > 0 ? checked : ""}`,
  ];
  if (redundant.length > 0) parts.push(`${enumerate(redundant)} redundant${checked}`);
  if (open.length > 0) parts.push(`${enumerate(open)} open`);
  return parts.join("; ");
}

function compareSummary(answer: CompareAnswer): string {
  const { pairs, names } = answer;
  const checked = answer.evidence === null ? "" : " (checked)";
  if (pairs.length === 1) return pairSummary(pairs[0]!, names, checked);
  if (pairs.length === 0) return "one theory: nothing to compare";
  const verdicts = pairs.map((pair) => pair.verdict);
  const settled = `${counted(pairs.length, "pair")}: ${tally(verdicts, checked)}`;
  const halves = pairs.filter(
    ({ verdict, leftOnly, rightOnly }) => verdict === "open" && (leftOnly ?? rightOnly) !== null,
  );
  return halves.length === 0 ? settled : `${settled}, in ${halves.length} one direction refuted${checked}`;
}

/** What is known of one pair, as a sentence. */
function pairSummary(pair: PairAnswer, names: readonly string[], checked: string): string {
  return `${pair.verdict}: ${pairReason(pair, names, checked)}`;
}

export function pairReason(pair: PairAnswer, names: readonly string[], checked: string): string {
  const [left, right] = [names[pair.left]!, names[pair.right]!];
  const found: string[] = [];
  if (pair.leftOnly !== null)
    found.push(`a model of ${left} on ${domainOf(pair.leftOnly)} is none of ${right}${checked}`);
  else if (pair.leftEntailsRight) found.push(`${left} entails ${right}${checked}`);
  if (pair.rightOnly !== null)
    found.push(`a model of ${right} on ${domainOf(pair.rightOnly)} is none of ${left}${checked}`);
  else if (pair.rightEntailsLeft) found.push(`${right} entails ${left}${checked}`);
  if (
    pair.verdict === "open" ||
    pair.verdict === "at-least-as-strong" ||
    pair.verdict === "at-most-as-strong"
  ) {
    if (pair.leftOnly === null && pair.verdict !== "at-least-as-strong")
      found.push(`whether ${left} entails ${right} is open`);
    if (pair.rightOnly === null && pair.verdict !== "at-most-as-strong")
      found.push(`whether ${right} entails ${left} is open`);
  }
  return found.length === 0 ? `${left} and ${right}` : found.join("; ");
}

function minimiseSummary(answer: MinimiseAnswer, budget: number): string {
  const { sets, complete, open, ended } = answer;
  const checked = answer.evidence === null ? "" : " (checked)";
  const labels = (set: readonly string[]) => `{${set.join(", ")}}`;
  const found =
    sets.length === 0
      ? "no irredundant set of axioms found"
      : `${enumerate(sets.map((set) => labels(set.labels)))} ${sets.length === 1 ? "is" : "are"} irredundant and ${
          sets.length === 1 ? "has" : "have"
        } all axioms as consequences${complete ? "" : checked}`;
  if (complete) return `${found}; there is no other such set${checked}`;
  const more = open.length === 0 ? "" : `; ${counted(open.length, "set")} open`;
  return `${found}${more}${ended === null ? "" : `; ${endText(ended, budget, null)}`}`;
}

function dualSummary(answer: DualAnswer): string {
  const checked = answer.evidence === null ? "" : " (checked)";
  return `${counted(answer.pairs.length, "pair")} of ${answer.duals.length} duals: ${tally(
    answer.pairs.map(({ verdict }) => verdict),
    checked,
  )}`;
}

/** `4 incomparable (checked); 2 open`, in the order of first occurrence. */
function tally(verdicts: readonly string[], checked: string): string {
  const counts = new Map<string, number>();
  for (const verdict of verdicts) counts.set(verdict, (counts.get(verdict) ?? 0) + 1);
  const open = counts.get("open");
  counts.delete("open");
  const settled = [...counts].map(([verdict, count]) => `${count} ${verdict}`);
  const parts = settled.length === 0 ? [] : [enumerate(settled) + checked];
  if (open !== undefined) parts.push(`${open} open`);
  return parts.join("; ");
}
