/** Where the relations of a structure on a carrier hold, kind by kind of two elements. */
import type { Carrier } from "../../lib/carriers/carrier.ts";
import { kindExamplesOf } from "../../lib/carriers/kind-examples.ts";
import { countKinds } from "../../lib/carriers/listing.ts";
import type { Structure, Table } from "../../lib/carriers/structure.ts";
import { vocabularyOf } from "../../lib/carriers/vocabulary/of.ts";
import { printCarrierFormula } from "../../lib/language/carrier-printing.ts";
import { printFormula } from "../../lib/language/printer.ts";
import { allOf, elementsOf, notOf } from "../../lib/logic/carrier-formulas.ts";
import { atom } from "../../lib/logic/formula.ts";
import type { CarrierAtom, CarrierFormula } from "../../lib/logic/structure-definition.ts";
import { cellOf, type TableBlock } from "./blocks.ts";

/** Kinds beyond which a table would not be read. */
const MOST_KINDS = 60;

/**
 * A row for each kind of two elements x and y, one of each two that are the same read backwards, with where the
 * two-place relations hold.
 * @returns null when there is no two-place relation, or too many kinds
 */
export function kindTable(structure: Structure): TableBlock | null {
  const { carrier } = structure;
  const tables = [...structure.tables.values()].filter(({ relation }) => relation.places === 2);
  if (tables.length === 0 || tables.length > 3 || countKinds(carrier, 2) > 2 * MOST_KINDS) return null;
  const examples = kindExamplesOf(carrier, 2);
  const kinds = examples.flatMap((example, kind) => {
    const back = carrier.kindOf(example, [1, 0]);
    // Of a kind and itself read backwards, the one of which more holds.
    const isBetter = weightOf(tables, kind) - weightOf(tables, back) || back - kind;
    return isBetter < 0 ? [] : [{ kind, back }];
  });
  if (kinds.length > MOST_KINDS) return null;
  const rank = ({ kind, back }: { kind: number; back: number }) =>
    2 * weightOf(tables, kind) + weightOf(tables, back);
  kinds.sort((one, other) => rank(other) - rank(one));
  const head = tables.flatMap(({ relation }) => [
    printFormula(atom(relation, "x", "y"), "unicode"),
    printFormula(atom(relation, "y", "x"), "unicode"),
  ]);
  const formulas = describingFormulas(carrier, examples);
  return {
    kind: "table",
    caption: null,
    head: ["two elements x and y", ...head],
    rows: kinds.map(({ kind, back }) => [
      [cellOf(kindText(formulas[kind]!, "unicode"), kindText(formulas[kind]!, "latex"))],
      ...tables.flatMap(({ holds }) => [[String(holds[kind]!)], [String(holds[back]!)]]),
    ]),
    look: "kinds",
  };
}

/** The relations that hold at a kind, as a number, the first counting most. */
function weightOf(tables: readonly Table[], kind: number): number {
  return tables.reduce((value, { holds }) => 2 * value + holds[kind]!, 0);
}

function kindText(parts: readonly CarrierFormula[], notation: "unicode" | "latex"): string {
  return printCarrierFormula(allOf(parts), notation);
}

/** For each kind few atoms and denials of atoms that are true of it, and together of no other. */
function describingFormulas(
  carrier: Carrier,
  examples: readonly unknown[],
): readonly (readonly CarrierFormula[])[] {
  const vocabulary = vocabularyOf(carrier);
  const place = (variable: string) => (variable === "x" ? 0 : 1);
  const atoms = vocabulary.atoms(["x", "y"]).filter((one) => vocabulary.complaint(one) === null);
  const truth = atoms.map((one) => examples.map((example) => vocabulary.holds(one, example, place)));
  const numbers = atoms.map((_, number) => number);
  return examples.map((_, kind) => {
    const isTrue = (number: number) => truth[number]![kind]!;
    const isTold = (chosen: readonly number[]) =>
      examples.every(
        (__, other) => other === kind || chosen.some((number) => truth[number]![other] !== isTrue(number)),
      );
    // What others say already goes, denials first.
    let chosen = [...numbers.filter(isTrue), ...numbers.filter((number) => !isTrue(number))];
    for (const number of [...chosen].reverse()) {
      const without = chosen.filter((one) => one !== number);
      if (isTold(without)) chosen = without;
    }
    const inside = chosen.some((number) => isInCopies(atoms[number]!));
    const shared = numbers.filter(
      (number) => inside && !chosen.includes(number) && isSameCopy(atoms[number]!),
    );
    return [...shared, ...chosen].map((number) => (isTrue(number) ? atoms[number]! : notOf(atoms[number]!)));
  });
}

/** Whether an atom compares places in copies, which it can only in one copy: then that is said as well. */
function isInCopies(said: CarrierAtom): boolean {
  const elements = elementsOf(said);
  return elements.length === 2 && elements.every(({ path }) => path.length === 1 && path[0] === "inner");
}

function isSameCopy(said: CarrierAtom): boolean {
  const isEquation = said.kind === "compare" && said.relation === "=";
  return isEquation && elementsOf(said).every(({ path }) => path.length === 1 && path[0] === "outer");
}
