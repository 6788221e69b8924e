/** Derivations as they are shown: line, sentence, because. */
import type { ShownDerivation } from "../../lib/inquiry/answer.ts";
import { type Block, enumerated, formulaOf, type Inline, note, type TableBlock, termOf } from "./blocks.ts";
import {
  type Citation,
  type Inference,
  type Introduction,
  type Reading,
  type ReadingLine,
  readDerivation,
} from "./derivation-reading.ts";
import { counted, enumerate } from "./text.ts";

/** Lines that stand open; a longer derivation is closed at first. */
const OPEN_LINES = 14;
/** Axioms that a title names; more are counted. */
const NAMED_AXIOMS = 6;

/** A derivation for people who have had one course of logic; a long one is closed at first. */
export function showDerivation(shown: ShownDerivation): readonly Block[] {
  const { rows, title, table, remark } = layOut(shown);
  if (rows > OPEN_LINES) return [{ kind: "fold", title, blocks: [remark, table] }];
  return [{ ...table, caption: `Derivation: ${shown.role}` }, remark];
}

/** Several derivations: each by itself, closed at first. One alone is shown as {@link showDerivation} does. */
export function showDerivations(several: readonly ShownDerivation[]): readonly Block[] {
  if (several.length === 1) return several.flatMap(showDerivation);
  return several.map((shown) => {
    const { title, table, remark } = layOut(shown);
    return { kind: "fold", title, blocks: [remark, table] };
  });
}

function layOut(shown: ShownDerivation) {
  const reading = readDerivation(shown);
  const rows = [...reading.lines.map(lineCells), ...conclusionCells(reading, shown)];
  const table: TableBlock = {
    kind: "table",
    caption: null,
    head: ["line", "sentence", "because"],
    rows: rows.map((cells, index) => [[String(index + 1)], ...cells]),
    look: "derivation",
  };
  const from = reading.labels.length === 0 ? "" : `, from ${axiomsText(reading.labels)}`;
  const title = `Derivation, ${counted(rows.length, "line")}${from}: ${shown.role}`;
  return { rows: rows.length, title, table, remark: note(remarkOn(reading)) };
}

/** What was used, and how to read it. */
function remarkOn({ labels, isGeneral }: Reading): string {
  const used = labels.length === 0 ? "No axiom is used." : `Uses ${axiomsText(labels)}.`;
  return isGeneral ? `${used} Variables without a quantifier stand for all elements.` : used;
}

function axiomsText(labels: readonly string[]): string {
  return labels.length > NAMED_AXIOMS ? counted(labels.length, "axiom") : enumerate(labels);
}

/** A row without its number. */
type Cells = readonly (readonly Inline[])[];

function lineCells(line: ReadingLine): Cells {
  const { sentence, introduced } = line;
  const reason = reasonParts(line);
  const names = introducedParts(introduced);
  return [
    sentence === null ? ["contradiction"] : [formulaOf(sentence)],
    names.length === 0 ? reason : [...reason, "; ", ...names],
  ];
}

/** The last line, where the conclusion was supposed to be false. */
function conclusionCells({ lines }: Reading, { conclusion }: ShownDerivation): readonly Cells[] {
  const supposed = lines.findIndex(({ reason }) => reason.kind === "supposition") + 1;
  if (supposed === 0 || conclusion === null) return [];
  return [[[formulaOf(conclusion)], [`so ${supposed} is false and the conclusion holds`]]];
}

function reasonParts({ reason }: ReadingLine): readonly Inline[] {
  switch (reason.kind) {
    case "axiom":
      return [`axiom ${reason.label}`];
    case "supposition":
      return ["suppose not: the conclusion is false"];
    case "definition":
      return [`${reason.name} is short for the right-hand side`];
    case "inside":
      return [`from ${reason.from}, quantifiers moved inside`];
    case "written-out":
      return [`from ${reason.from}, with ${reason.name} written out as in ${reason.by}`];
    case "abbreviated":
      return [`from ${reason.from}, with ${reason.name} put in as in ${reason.by}`];
    case "read-off":
      return [`from ${reason.from}`];
    case "inference":
      return inferenceParts(reason);
  }
}

function inferenceParts({ cited, since, byIdentity }: Inference): readonly Inline[] {
  const parts: Inline[] = [...citedParts(cited)];
  for (const [index, { equation, line }] of since.entries())
    parts.push(index === 0 ? ", since " : " and ", formulaOf(equation), ` (line ${line})`);
  if (parts.length === 0) return ["by the laws of identity"];
  return byIdentity ? [...parts, ", by the laws of identity"] : parts;
}

/** `from 5 and 6, and 2 with x = a, y = b`. */
function citedParts(cited: readonly Citation[]): readonly Inline[] {
  if (cited.length === 0) return [];
  const plain = cited.filter(({ values }) => values.length === 0).map(({ line }) => String(line));
  const parts: Inline[] = [`from ${enumerate(plain)}`];
  for (const [index, { line, values }] of cited.filter((one) => one.values.length > 0).entries()) {
    if (index > 0 || plain.length > 0) parts.push(", and ");
    parts.push(`${line} with `);
    for (const [place, { variable, value }] of values.entries())
      parts.push(place === 0 ? "" : ", ", formulaOf({ kind: "equal", left: variable, right: value }));
  }
  return parts;
}

/** `let a and b be such x and y`; `for each x let f(x) be such a y`. */
function introducedParts(introduced: readonly Introduction[]): readonly Inline[] {
  const clauses: (readonly Inline[])[] = [];
  const constants = introduced.filter(({ parameters }) => parameters.length === 0);
  for (const isPromised of [true, false]) {
    const found = constants.filter(({ variable }) => (variable !== null) === isPromised);
    if (found.length === 0) continue;
    const names = enumerated(found.map(({ term }) => termOf(term)));
    const variables = found.flatMap(({ variable }) => variable ?? []);
    const sought = isPromised && new Set(variables).size === variables.length ? variables : null;
    clauses.push([
      "let ",
      ...names,
      isPromised ? " be such " : found.length === 1 ? " be any element" : " be any elements",
      ...(!isPromised
        ? []
        : sought === null
          ? ["elements"]
          : [sought.length === 1 ? `${articleOf(sought[0]!)} ` : "", ...enumerated(sought.map(termOf))]),
    ]);
  }
  for (const { term, parameters, variable } of introduced) {
    if (parameters.length === 0) continue;
    const scope: readonly Inline[] = ["for all ", ...enumerated(parameters.map(termOf))];
    clauses.push([
      ...(parameters.length === 1 ? ["for each ", termOf(parameters[0]!)] : scope),
      " let ",
      termOf(term),
      ...(variable === null ? [" be any element"] : [` be such ${articleOf(variable)} `, termOf(variable)]),
    ]);
  }
  return clauses.flatMap((parts, index) => (index === 0 ? parts : ["; ", ...parts]));
}

/** The article of a letter as it is spoken: an x, a y. */
function articleOf(letter: string): string {
  return /^[aefhilmnorsx]/.test(letter) ? "an" : "a";
}
