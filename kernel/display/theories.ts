/** Theories as tables, and what can be read off their formulas. */
import type { TermFormula } from "../../lib/logic/clausal.ts";
import { type Formula, type RelationSymbol, variablesOf } from "../../lib/logic/formula.ts";
import {
  describeSyntax,
  type Membership,
  type PrefixBlock,
  type SyntaxReport,
} from "../../lib/logic/fragments.ts";
import { normalise } from "../../lib/logic/normal-forms/normalise.ts";
import type { NormalForm } from "../../lib/logic/normal-forms/result.ts";
import { sentencesOf, type Theory, theoryDepth, theorySignature } from "../../lib/logic/theory.ts";
import { type Block, formulaOf, type Inline, line, type TableBlock } from "./blocks.ts";
import { counted, enumerate } from "./text.ts";

/** Theories with more axioms than this are folded where they are not the point of the cell. */
export const FOLDED_AXIOMS = 12;

/** A table of labels and sentences. */
export function theoryTable(caption: string | null, theory: Theory, extra: "prefix" | null = null): Block {
  if (theory.axioms.length === 0) return line(caption === null ? "no axioms" : `${caption}: no axioms`);
  const table: TableBlock = {
    kind: "table",
    caption,
    head: ["label", ...(extra === null ? [] : ["prefix"]), "sentence"],
    rows: theory.axioms.map((axiom) => [
      [axiom.label],
      ...(extra === null ? [] : [[prefixOf(axiom.formula)]]),
      [formulaOf(axiom.formula)],
    ]),
    look: "prose",
  };
  return table;
}

/** What `describe` says below the table: measures, and the decidable fragments that the axioms fall into. */
export function theoryFacts(theory: Theory): readonly Block[] {
  const signature = theorySignature(theory);
  const variables = new Set(theory.axioms.flatMap((axiom) => variablesOf(axiom.formula)));
  const facts: [string, string][] = [
    ["axioms", String(theory.axioms.length)],
    ["signature", signature.relations.map(relationText).join(", ") || "no relations"],
    ["identity", identityText(signature.identity)],
    ["depth", String(theoryDepth(theory))],
    ["variables", variables.size === 0 ? "0" : `${variables.size}: ${[...variables].sort().join(", ")}`],
  ];
  if (theory.axioms.length === 0) return [factTable(facts)];
  const report = describeSyntax(sentencesOf(theory));
  return [factTable([...facts, ...syntaxFacts(report, theory.axioms.length > 1)]), ...fragmentBlocks(report)];
}

/** Bounds on the size of models beyond this are published, and out of reach of a search. */
const REACHED_POINTS = 6;

/** Measures that take a normal form. */
export function syntaxFacts(report: SyntaxReport, isJoint: boolean): readonly [string, string][] {
  const { prefix, alternations, variables, leastVariables, finiteCheck } = report;
  const facts: [string, string][] = [];
  if (prefix !== null) facts.push([isJoint ? "prefix of all together" : "prefix", prefixText(prefix)]);
  if (alternations !== null) facts.push(["alternations", String(alternations)]);
  if (leastVariables < variables)
    facts.push(["variables that suffice", `${leastVariables}, when quantifiers are moved inwards`]);
  if (finiteCheck !== null && finiteCheck.points <= REACHED_POINTS)
    facts.push([
      "finite check",
      `consistency is decided by models on up to ${counted(finiteCheck.points, "point")}: ${finiteCheck.reason} (${finiteCheck.source})`,
    ]);
  return facts;
}

/** The decidable fragments, with what is published about each. */
export function fragmentBlocks({ fragments }: SyntaxReport): readonly Block[] {
  if (fragments.length === 0) return [];
  return [
    {
      kind: "table",
      caption: "Decidable fragments",
      head: ["fragment", "sentences", "what is published, and where"],
      rows: fragments.map((membership) => [
        [membership.name],
        [membership.form],
        [`${publishedText(membership)} (${membership.source})`],
      ]),
      look: "prose",
    },
  ];
}

function publishedText({ decidable, finiteModelProperty, bound, points }: Membership): string {
  const parts = [
    decidable === "yes" ? "decidable" : "finite satisfiability decidable",
    finiteModelProperty ? "finite model property" : "no finite model property",
  ];
  if (bound !== null) parts.push(bound);
  if (points !== null) parts.push(`here at most ${counted(points, "point")}`);
  return parts.join("; ");
}

/** For `eval --json`. */
export function syntaxData(report: SyntaxReport): Readonly<Record<string, unknown>> {
  const { alternations, leastVariables, prefix, fragments, finiteCheck } = report;
  return {
    alternations,
    leastVariables,
    prefixClass: prefix === null ? null : prefixText(prefix),
    fragments: fragments.map(({ fragment, decidable, finiteModelProperty, bound, points, source }) => ({
      fragment,
      decidable,
      finiteModelProperty,
      bound,
      points,
      source,
    })),
    finiteCheck: finiteCheck === null ? null : finiteCheck.points,
  };
}

/** Two columns: what, and its value. */
export function factTable(facts: readonly (readonly [string, Inline])[]): Block {
  return {
    kind: "table",
    caption: null,
    head: ["property", "value"],
    rows: facts.map(([name, value]) => [[name], [value]]),
    look: "prose",
  };
}

export function identityText(identity: boolean): string {
  return identity
    ? "= occurs; questions are asked with identity"
    : "= does not occur; questions are asked without identity";
}

/** `R (2 places)`, `≺ (2 places, infix)`. */
export function relationText(relation: RelationSymbol): string {
  return `${relation.name} (${counted(relation.places, "place")}${relation.infix ? ", infix" : ""})`;
}

const knownPrefixes = new WeakMap<Formula, string>();

/**
 * The quantifiers of a prenex form of a formula, outermost first: `∀∀∃`, or `none` for one without quantifiers. Of
 * its prenex forms this is one with the fewest changes of quantifier; free variables stay free.
 */
export function prefixOf(formula: Formula): string {
  const known = knownPrefixes.get(formula);
  if (known !== undefined) return known;
  const result = normalise(formula, "prenex");
  const text = result.outcome === "refused" ? "too large to tell" : prefixText(blocksOf(result));
  knownPrefixes.set(formula, text);
  return text;
}

/** The quantifiers in front of a prenex form. */
function blocksOf({ value }: NormalForm): readonly PrefixBlock[] {
  const blocks: { kind: PrefixBlock["kind"]; count: number }[] = [];
  let part: TermFormula | null = value.kind === "clauses" ? null : value.formula;
  while (part !== null && (part.kind === "forall" || part.kind === "exists")) {
    const last = blocks.at(-1);
    if (last?.kind === part.kind) last.count += 1;
    else blocks.push({ kind: part.kind, count: 1 });
    part = part.body;
  }
  return blocks;
}

export function prefixText(blocks: readonly PrefixBlock[]): string {
  if (blocks.length === 0) return "none";
  return blocks
    .map(({ kind, count }) => {
      const sign = kind === "forall" ? "∀" : "∃";
      return count <= 4 ? sign.repeat(count) : `${sign}${superscript(count)}`;
    })
    .join("");
}

function superscript(count: number): string {
  return [...String(count)].map((digit) => "⁰¹²³⁴⁵⁶⁷⁸⁹"[Number(digit)]!).join("");
}

/** Axiom labels in a sentence: `irr and trans`. */
export function labelList(labels: readonly string[]): string {
  return enumerate(labels);
}
