/**
 * Structures on infinite carriers as they are shown: the domain in words, the relations by their definition, where each
 * kind of pair stands, and a drawn sample.
 */
import type { Structure } from "../../lib/carriers/structure.ts";
import { printStructureDefinition } from "../../lib/language/carrier-printing.ts";
import { atomsOf } from "../../lib/logic/carrier-formulas.ts";
import type { StructureDefinition } from "../../lib/logic/structure-definition.ts";
import { type Block, cellOf, line } from "./blocks.ts";
import { carrierWords, definitionFor } from "./definition-text.ts";
import { kindTable } from "./kinds.ts";
import { drawSample } from "./sample-drawing.ts";

/** A definition stands on the line that names the structure if both together have at most so many characters. */
const SHORT_LINE = 80;
/** A definition that says more is easier to follow beside a table of the kinds of pairs. */
const SHORT_FORMULA = 2;
/** Tables of kinds with more rows are closed at first. */
const OPEN_ROWS = 12;

/**
 * @param role what it is an example of, as a noun phrase: `countermodel`
 * @param own the definition that the user gave; the reader knows then what it lives on
 */
export function definedBlocks(
  role: string,
  structure: Structure,
  own: StructureDefinition | null = null,
): readonly Block[] {
  const definition = own ?? definitionFor(structure);
  const title = own === null ? titleOf(role, structure) : role;
  const blocks: Block[] = [];
  if (definition === null) blocks.push(line(title), line("There is no short definition of its relations."));
  else {
    const text = printStructureDefinition(definition, "unicode");
    const cell = cellOf(text, printStructureDefinition(definition, "latex"));
    if (own !== null) blocks.push(line(`${title}: `, cell));
    else if (title.length + text.length <= SHORT_LINE) blocks.push(line(`${title}; `, cell));
    else blocks.push(line(title), line(cell));
  }
  const table = definition !== null && isEasy(definition) ? null : kindTable(structure);
  const picture = drawSample(structure);
  const views: Block[] = [];
  if (table !== null && table.rows.length <= OPEN_ROWS) views.push(table);
  if (picture !== null) views.push(picture);
  if (views.length > 0) blocks.push({ kind: "beside", blocks: views });
  if (table !== null && table.rows.length > OPEN_ROWS)
    blocks.push({ kind: "fold", title: `${table.rows.length} kinds of pairs`, blocks: [table] });
  return [{ kind: "group", blocks }];
}

/** `countermodel, infinite: the rational line`. */
function titleOf(role: string, { carrier }: Structure): string {
  const isSaid = carrier.size !== null || /infinite/.test(role);
  return `${role}${isSaid ? "" : ", infinite"}: ${carrierWords(carrier.description)}`;
}

function isEasy({ relations }: StructureDefinition): boolean {
  return relations.every(
    (defined) => !("formula" in defined) || atomsOf(defined.formula).length <= SHORT_FORMULA,
  );
}
