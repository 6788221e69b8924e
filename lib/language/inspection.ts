/** What stands at the cursor, as data; showing it is the kernel's part. */
import type { Formula, RelationSymbol } from "../logic/formula.ts";
import { findProperty, type NamedProperty, propertyOf } from "../logic/properties.ts";
import type { Theory } from "../logic/theory.ts";
import { carrierHelp, elementHelp } from "./carrier-help.ts";
import { describeCarrier } from "./carrier-words.ts";
import type { Place } from "./diagnostics.ts";
import { claimForms, helpOf, listWords, normalFormHelp, optionHelp } from "./help.ts";
import { findInexpressible, type Inexpressible } from "./inexpressible.ts";
import { readTokens, type Token } from "./lexer.ts";
import { isVariable } from "./names.ts";
import { readCell } from "./parser.ts";
import { printFormula } from "./printer.ts";
import { type Definition, defaultRelation, type Scope } from "./statements.ts";
import { keywords, relationSigns, signs } from "./tokens.ts";

interface InspectionBase extends Place {
  readonly name: string;
  /** How it is written. */
  readonly signature: string;
  /** One sentence. */
  readonly meaning: string;
}

export type Inspection = InspectionBase &
  (
    | { readonly kind: "statement" | "keyword" | "symbol" }
    /** For an axiom, `Dense.mid`, the definition is that of its sentence. */
    | { readonly kind: "definition"; readonly definition: Definition }
    | { readonly kind: "relation"; readonly relation: RelationSymbol }
    /** The meaning says its formula, of the first relation with two places, its other names and its source. */
    | { readonly kind: "property"; readonly property: NamedProperty; readonly formula: Formula }
  );

/**
 * Tells what stands at the cursor or ends there; null when there is nothing to say. Names are those before the
 * cell and those that the cell defines.
 * @param cursor in code points
 */
export function inspectAt(text: string, cursor: number, scope: Scope): Inspection | null {
  const tokens = readTokens(text);
  const inside = tokens.findIndex(({ from, to }) => from <= cursor && cursor < to);
  const at = inside >= 0 ? inside : tokens.findIndex(({ from, to }) => from < to && to === cursor);
  const token = tokens[at];
  if (token === undefined) return null;
  if (token.kind !== "word" && token.kind !== "relation-sign") return inspectSign(token);
  const { names } = readCell(text, scope);
  const place = { from: token.from, to: token.to };
  const owner = tokens[at - 1]?.kind === "dot" ? names.find(tokens[at - 2]?.text ?? "") : null;
  if (owner?.kind === "theory") return inspectAxiom(owner.definition, token);
  const named = names.find(token.text);
  if (named?.kind === "relation") return inspectRelation(named.relation, place);
  if (named !== null && named.kind !== "damaged") return inspectDefinition(named.definition, place);
  const before = tokens[at - 1]?.text ?? "";
  const generic = carrierHelp.find(({ word }) => before === "generic" && word === `generic ${token.text}`);
  if (generic !== undefined)
    return { kind: "keyword", name: token.text, signature: generic.form, meaning: generic.meaning, ...place };
  if (named === null && token.kind === "word") {
    const property = findProperty(token.text);
    if (property !== undefined) return inspectProperty(property, names.relations, place);
    const refused = findInexpressible(token.text);
    if (refused !== undefined) return { kind: "keyword", ...inexpressibleText(refused), ...place };
  }
  const help = helpOf(token.text);
  if (help !== undefined && (token.lineStart || at === 0))
    return { kind: "statement", name: help.word, signature: help.form, meaning: help.meaning, ...place };
  const word = inspectWord(token.text) ?? inspectCarrierWord(tokens, at);
  if (word !== null) return { kind: "keyword", name: token.text, ...word, ...place };
  const letter = names.find(String.fromCodePoint(token.text.codePointAt(0)!));
  if (letter?.kind === "relation" && token.kind === "word") return inspectRelation(letter.relation, place);
  if (isVariable(token.text) || token.kind === "word") return null;
  return inspectSign(token);
}

function inspectProperty(
  property: NamedProperty,
  relations: readonly RelationSymbol[],
  place: Place,
): Inspection {
  const { name, synonyms, source } = property;
  const relation = relations.find(({ places }) => places === 2) ?? defaultRelation;
  const formula = propertyOf(property, relation);
  const also = synonyms.length === 0 ? "" : ` Also called ${listWords(synonyms.map((one) => `\`${one}\``))}.`;
  const parts = property.parts.length === 0 ? "" : ` It is ${property.parts.join(" ∧ ")}.`;
  const meaning = `${property.meaning}${parts} ${printed(formula)}.${also} Source: ${source}.`;
  return {
    kind: "property",
    name,
    signature: `${name}(${relation.name})`,
    meaning,
    property,
    formula,
    ...place,
  };
}

function inexpressibleText({ word, reason, instead, approximate }: Inexpressible) {
  return {
    name: word,
    signature: approximate === null ? word : `${word}(R) up to n`,
    meaning: `First-order logic cannot say it: ${reason}. Instead: ${instead}.`,
  };
}

function inspectWord(word: string): { readonly signature: string; readonly meaning: string } | null {
  const option = optionHelp.find((one) => one.word === word);
  if (option !== undefined) return { signature: option.form, meaning: option.meaning };
  const keyword = keywords.find((one) => one.word === word);
  if (keyword !== undefined) return { signature: word, meaning: keyword.meaning };
  const form = normalFormHelp.find(({ phrase }) => phrase.includes(word));
  if (form !== undefined)
    return { signature: `normalise φ to ${form.phrase.join(" ")} form`, meaning: form.meaning };
  const claim = claimForms.find(({ phrase }) => phrase.includes(word));
  return claim === undefined ? null : { signature: claim.form, meaning: claim.meaning };
}

/** A word of carriers, or of what is said of their elements. */
function inspectCarrierWord(
  tokens: readonly Token[],
  at: number,
): { readonly signature: string; readonly meaning: string } | null {
  const { text } = tokens[at]!;
  const element = elementHelp.find(({ word }) => word === text);
  const isCalled = tokens[at + 1]?.kind === "open" || tokens[at - 1]?.kind === "dot";
  if (element !== undefined && isCalled) return { signature: element.form, meaning: element.meaning };
  const singular = text === "copy" ? "copies" : text === "forest" ? "tree" : text;
  const pairs = [`${singular} ${tokens[at + 1]?.text}`, `${tokens[at - 1]?.text} ${singular}`];
  const help =
    carrierHelp.find(({ word }) => pairs.includes(word)) ??
    carrierHelp.find(({ word }) => word === singular) ??
    carrierHelp.find(({ word }) => word === "at each point of" && ["at", "each"].includes(text));
  return help === undefined ? null : { signature: help.form, meaning: help.meaning };
}

function inspectSign(token: Token): Inspection | null {
  const place = { from: token.from, to: token.to };
  const sign = signs.find(({ kind }) => kind === token.kind);
  if (sign !== undefined) {
    const spellings = [sign.symbol, ...sign.ascii, ...sign.latex].join("  ");
    return { kind: "symbol", name: sign.symbol, signature: spellings, meaning: sign.meaning, ...place };
  }
  const relation = relationSigns.find(({ symbol }) => symbol === token.text);
  if (relation === undefined) return null;
  return {
    kind: "symbol",
    name: relation.symbol,
    signature: [relation.symbol, ...relation.latex].join("  "),
    meaning: `Can be declared: \`relation ${relation.symbol} infix\`.`,
    ...place,
  };
}

function inspectRelation(relation: RelationSymbol, place: Place): Inspection {
  const { name, places, infix } = relation;
  const variables = Array.from({ length: Math.min(places, 6) }, (_, index) => "xyzuvw"[index]!);
  const signature = infix ? `x ${name} y` : `${name}(${variables.join(", ")}${places > 6 ? ", …" : ""})`;
  const meaning = `A relation of ${places} ${places === 1 ? "place" : "places"}.`;
  return { kind: "relation", name, signature, meaning, relation, ...place };
}

function inspectDefinition(definition: Definition, place: Place): Inspection {
  const { name } = definition;
  switch (definition.kind) {
    case "theory": {
      const count = definition.theory.axioms.length;
      const meaning = `A theory of ${count} ${count === 1 ? "axiom" : "axioms"}.`;
      return { kind: "definition", name, signature: name, meaning, definition, ...place };
    }
    case "structure": {
      const meaning = `A structure on ${describeCarrier(definition.structure.carrier)}.`;
      return { kind: "definition", name, signature: name, meaning, definition, ...place };
    }
    case "formula": {
      const { parameters, body } = definition;
      const signature = parameters.length === 0 ? name : `${name}(${parameters.join(", ")})`;
      const meaning = `${parameters.length === 0 ? "The sentence" : "The formula"} ${printed(body)}.`;
      return { kind: "definition", name, signature, meaning, definition, ...place };
    }
  }
}

function inspectAxiom(
  owner: { readonly name: string; readonly theory: Theory },
  label: Token,
): Inspection | null {
  const axiom = owner.theory.axioms.find((candidate) => candidate.label === label.text);
  if (axiom === undefined) return null;
  const name = `${owner.name}.${axiom.label}`;
  return {
    kind: "definition",
    name,
    signature: name,
    meaning: `The axiom ${printed(axiom.formula)}.`,
    definition: { kind: "formula", name, parameters: [], body: axiom.formula },
    from: label.from,
    to: label.to,
  };
}

function printed(formula: Formula): string {
  const points = [...printFormula(formula, "unicode")];
  return points.length > 120 ? `${points.slice(0, 119).join("")}…` : points.join("");
}
