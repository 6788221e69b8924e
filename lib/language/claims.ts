/** What `claim`, `conjecture` and `derive` say: an entailment, or a property of a theory. */
import { type Formula, type RelationSymbol, relationsOf } from "../logic/formula.ts";
import { findProperty } from "../logic/properties.ts";
import { theorySignature } from "../logic/theory.ts";
import type { Place } from "./diagnostics.ts";
import { readClosed } from "./formulas.ts";
import { claimForms } from "./help.ts";
import { findInexpressible } from "./inexpressible.ts";
import type { Token } from "./lexer.ts";
import { nearestName } from "./nearest.ts";
import { quote, type Reader, Unreadable } from "./reader.ts";
import type { Claim, NamedSentence, NamedStructure, NamedTheory } from "./statements.ts";
import { isStructureAhead, readStructure } from "./structures.ts";
import { reportInexpressible } from "./terms.ts";
import { readTheory } from "./theories.ts";
import { callForm } from "./wording.ts";

const FORMS = claimForms.map(({ form }) => `\`${form}\``).join(", ");

/** Reads a claim; null after a mistake. */
export function readClaim(reader: Reader): Claim | null {
  const first = reader.peek();
  if (isStructureAhead(reader)) {
    const structure = readStructure(reader);
    return readTruth(reader, structure, { from: first.from, to: reader.last.to });
  }
  if (["forall", "exists", "not", "true", "false"].includes(first.kind))
    reader.failExpected(
      "a theory or a structure",
      "write `{} ⊨ φ` for a sentence that every structure makes true",
    );
  const theory = readTheory(reader);
  const sign = reader.peek();
  if (sign.kind === "entails" || sign.kind === "does-not-entail") {
    reader.next();
    const conclusion = readConclusion(reader, relationsAbout(theory));
    if (theory === null || conclusion === null) return null;
    return { kind: sign.kind, premises: theory, conclusion };
  }
  if (reader.acceptWord("has") !== null) {
    const hint = "write `has no finite model`";
    reader.expectWord("no", hint);
    reader.expectWord("finite", `${hint}; for a theory without any model, \`T ⊨ ⊥\``);
    if (reader.acceptWord("models") === null) reader.expectWord("model", hint);
    return theory === null ? null : { kind: "no-finite-model", theory };
  }
  if (reader.acceptWord("is") === null)
    reader.failExpected("`⊨`, `⊭`, `is` or `has no finite model`", `claims are ${FORMS}`);
  return readProperty(reader, theory);
}

/** Reads what follows `T is`. */
function readProperty(reader: Reader, theory: NamedTheory | null): Claim | null {
  const word = reader.peek();
  switch (word.kind === "word" ? word.text : "") {
    case "consistent":
    case "infinite-only":
    case "independent":
      reader.next();
      return theory === null ? null : { kind: word.text as "consistent", theory };
    case "weaker":
    case "equivalent": {
      reader.next();
      const kind = word.text as "weaker" | "equivalent";
      reader.expectWord(kind === "weaker" ? "than" : "to");
      const right = readTheory(reader);
      return theory === null || right === null ? null : { kind, left: theory, right };
    }
    case "complete":
      return reader.fail(
        "not-in-this-version",
        word,
        "`is complete to depth d` is not a claim of this version",
        `claims are ${FORMS}`,
      );
    default: {
      const refused = findInexpressible(word.text);
      const isOnly = reader.peekAfter(1).text === "only";
      if (refused !== undefined && word.kind === "word" && !isOnly) {
        reportInexpressible(reader, word, refused);
        throw new Unreadable(false);
      }
      return reader.failExpected(
        "`consistent`, `infinite-only`, `independent`, `weaker than` or `equivalent to`",
        hintForProperty(reader, word),
      );
    }
  }
}

function hintForProperty(reader: Reader, word: Token): string | null {
  const known = ["consistent", "infinite-only", "independent", "weaker", "equivalent"];
  const next = reader.peekAfter(1);
  const near = nearestName(word.text, known) ?? nearestName(`${word.text}-${next.text}`, known);
  if (word.text === "inconsistent") return "write `T ⊨ ⊥`";
  if (findProperty(word.text) !== undefined) return `write \`T ⊨ ${word.text}\``;
  if (word.text === "infinite" && next.text === "only") return "write `is infinite-only`";
  if (near === null) return `claims are ${FORMS}`;
  return `write \`is ${near}${near === "weaker" ? " than" : near === "equivalent" ? " to" : ""}\``;
}

/** Reads `⊨ φ` or `⊭ φ` after a structure. */
function readTruth(reader: Reader, structure: NamedStructure | null, subject: Place): Claim | null {
  const sign = reader.peek();
  if (sign.kind !== "entails" && sign.kind !== "does-not-entail")
    reader.failExpected(
      "`⊨` or `⊭` after a structure",
      "`is …` and `has …` are said of theories; of a structure, `A ⊨ φ` or `A ⊭ φ`",
    );
  reader.next();
  const first = reader.peek();
  const sentence = readConclusion(
    reader,
    structure?.structure.relations.map(({ relation }) => relation) ?? null,
  );
  if (structure === null || sentence === null) return null;
  const place = { from: first.from, to: reader.last.to };
  if (!checkInterpreted(reader, structure, sentence.formula, place)) return null;
  reader.charge(1, subject);
  return { kind: sign.kind === "entails" ? "true-in" : "false-in", structure, sentence };
}

/** Whether a structure says where all relations of a sentence hold; reports the first of which it does not. */
export function checkInterpreted(
  reader: Reader,
  structure: NamedStructure,
  sentence: Formula,
  place: Place,
): boolean {
  for (const relation of relationsOf(sentence)) {
    const given = structure.structure.relations.find((one) => one.relation.name === relation.name);
    if (given?.relation.places === relation.places) continue;
    reader.report(
      "relation-undefined",
      place,
      given === undefined
        ? `the structure ${quote(structure.text)} does not say where ${quote(relation.name)} holds`
        : `${quote(relation.name)} has ${given.relation.places} places in the structure ${quote(structure.text)}, and ${relation.places} in the sentence`,
      structure.structure.carrier.kind === "points"
        ? `add \`${relation.name} is { … }\` to the structure`
        : `add \`${callForm(relation.name, relation.places)} iff …\` to the structure`,
    );
    return false;
  }
  return true;
}

/**
 * Reads the sentence after `⊨`.
 * @param about the relations of what stands before it; null when a mistake hides them
 */
export function readConclusion(
  reader: Reader,
  about: readonly RelationSymbol[] | null,
): NamedSentence | null {
  reader.crossLine();
  return readClosed(reader, "the conclusion", { about });
}

/** The relations that a theory is about; null for one that could not be read. */
export function relationsAbout(theory: NamedTheory | null): readonly RelationSymbol[] | null {
  return theory === null ? null : theorySignature(theory.theory).relations;
}
