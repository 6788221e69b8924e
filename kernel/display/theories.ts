/** Theories as tables, and what can be read off their formulas. */
import { type Formula, partsOf, type RelationSymbol, variablesOf } from "../../lib/logic/formula.ts";
import { type Theory, theoryDepth, theorySignature } from "../../lib/logic/theory.ts";
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

/** What `describe` says below the table. */
export function theoryFacts(theory: Theory): Block {
  const signature = theorySignature(theory);
  const variables = new Set(theory.axioms.flatMap((axiom) => variablesOf(axiom.formula)));
  const facts: [string, string][] = [
    ["axioms", String(theory.axioms.length)],
    ["signature", signature.relations.map(relationText).join(", ") || "no relations"],
    ["identity", identityText(signature.identity)],
    ["depth", String(theoryDepth(theory))],
    ["variables", variables.size === 0 ? "0" : `${variables.size}: ${[...variables].sort().join(", ")}`],
  ];
  return factTable(facts);
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

/** A run of quantifiers of one kind. */
interface Run {
  readonly kind: "forall" | "exists";
  readonly count: number;
}

/**
 * The quantifiers of a prenex form of a sentence, outermost first: `∀∀∃`, or `none` for a sentence without
 * quantifiers. Quantifiers are pulled outwards with their sign; where the order is free, like ones are put together.
 * Of several prenex forms this is one with few changes of quantifier, not always the fewest.
 */
export function prefixOf(formula: Formula): string {
  const runs = prenexRuns(formula, true);
  if (runs.length === 0) return "none";
  return runs
    .map(({ kind, count }) => {
      const sign = kind === "forall" ? "∀" : "∃";
      return count <= 4 ? sign.repeat(count) : `${sign}${superscript(count)}`;
    })
    .join("");
}

function superscript(count: number): string {
  return [...String(count)].map((digit) => "⁰¹²³⁴⁵⁶⁷⁸⁹"[Number(digit)]!).join("");
}

function prenexRuns(formula: Formula, positive: boolean): readonly Run[] {
  switch (formula.kind) {
    case "forall":
    case "exists": {
      const kind = (formula.kind === "forall") === positive ? "forall" : "exists";
      return joined({ kind, count: 1 }, prenexRuns(formula.body, positive));
    }
    case "not":
      return prenexRuns(formula.body, !positive);
    case "implies":
      return merged([prenexRuns(formula.left, !positive), prenexRuns(formula.right, positive)]);
    case "iff":
      // (φ → ψ) ∧ (ψ → φ): each side stands once with each sign.
      return merged(
        [formula.left, formula.right].flatMap((side) => [prenexRuns(side, true), prenexRuns(side, false)]),
      );
    default:
      return merged(partsOf(formula).map((part) => prenexRuns(part, positive)));
  }
}

function joined(run: Run, rest: readonly Run[]): readonly Run[] {
  const [next, ...others] = rest;
  if (next === undefined || next.kind !== run.kind) return [run, ...rest];
  return [{ kind: run.kind, count: run.count + next.count }, ...others];
}

/** The prefixes of parts that stand side by side, interleaved with as few changes as either first kind gives. */
function merged(prefixes: readonly (readonly Run[])[]): readonly Run[] {
  const busy = prefixes.filter((prefix) => prefix.length > 0);
  if (busy.length <= 1) return busy[0] ?? [];
  const [withExists, withForall] = [mergedFrom("exists", busy), mergedFrom("forall", busy)];
  return withForall.length < withExists.length ? withForall : withExists;
}

function mergedFrom(first: Run["kind"], prefixes: readonly (readonly Run[])[]): readonly Run[] {
  const places = prefixes.map(() => 0);
  const runs: Run[] = [];
  let kind = first;
  while (places.some((place, index) => place < prefixes[index]!.length)) {
    let count = 0;
    prefixes.forEach((prefix, index) => {
      const run = prefix[places[index]!];
      if (run?.kind !== kind) return;
      count += run.count;
      places[index]! += 1;
    });
    if (count > 0) runs.push({ kind, count });
    kind = kind === "forall" ? "exists" : "forall";
  }
  return runs;
}

/** Axiom labels in a sentence: `irr and trans`. */
export function labelList(labels: readonly string[]): string {
  return enumerate(labels);
}
