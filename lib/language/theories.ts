/** Theory expressions: literals, and what is made of theories with `+`, `-`, `replacing` and the dualities. */
import type { Formula, RelationSymbol } from "../logic/formula.ts";
import {
  type Axiom,
  checkedTheory,
  complementTheory,
  converseTheory,
  joinTheories,
  replacingAxiom,
  singleAxiom,
  type Theory,
  type TheoryProblem,
  type TheoryResult,
  theorySignature,
  withoutAxiom,
} from "../logic/theory.ts";
import type { Place } from "./diagnostics.ts";
import { readClosed, readUnsettled, type UnsettledFormula } from "./formulas.ts";
import { readLabel, reportLabel } from "./labels.ts";
import { isSmtLib, type Token } from "./lexer.ts";
import { measureTheory } from "./measure.ts";
import { isStatementWord, MAX_NESTING, quote, type Reader, Unreadable } from "./reader.ts";
import { declaredIn, findSoleRelation, putRelation } from "./sole-relation.ts";
import type { NamedTheory } from "./statements.ts";
import { countOf, kindText } from "./wording.ts";

/** How many axioms a theory may have. */
export const MAX_AXIOMS = 500;

/** A theory expression that has been read: the theory is null after a mistake. */
export interface TheoryReading extends Place {
  readonly text: string;
  readonly theory: Theory | null;
}

/** Reads a theory expression; null after a mistake. Throws {@link Unreadable} when it is left in the middle. */
export function readTheory(reader: Reader): NamedTheory | null {
  const { text, theory } = readExpression(reader);
  return theory === null ? null : { text, theory };
}

function readExpression(reader: Reader): TheoryReading {
  let left = readPrimary(reader, []);
  for (;;) {
    if (reader.accept("plus") !== null) {
      reader.crossLine();
      left = join(reader, left, readPrimary(reader, relationsIn(left)));
    } else if (reader.accept("minus") !== null) {
      reader.crossLine();
      const label = readLabel(reader, "`-`");
      left = change(reader, left, label, `${left.text} - ${label.text}`, (theory) =>
        withoutAxiom(theory, label.text),
      );
    } else if (reader.acceptWord("replacing") !== null) {
      left = readReplacement(reader, left);
    } else return left;
  }
}

function readReplacement(reader: Reader, theory: TheoryReading): TheoryReading {
  const label = readLabel(reader, "`replacing`");
  reader.expectWord("by", `write \`replacing ${label.text} by φ\``);
  reader.crossLine();
  const axiom = readClosed(reader, `the axiom ${quote(label.text)}`, { about: relationsIn(theory) });
  const changed = change(
    reader,
    theory,
    label,
    `${theory.text} replacing ${label.text} by ${axiom?.text}`,
    (before) => replacingAxiom(before, label.text, axiom?.formula ?? { kind: "true" }),
  );
  return axiom === null ? { ...changed, theory: null } : changed;
}

/** The relations that occur in a theory; null when a mistake hides them. */
function relationsIn({ theory }: TheoryReading): readonly RelationSymbol[] | null {
  return theory === null ? null : theorySignature(theory).relations;
}

/** @param about the relations of the theory that this one is joined to, for bare properties */
function readPrimary(reader: Reader, about: readonly RelationSymbol[] | null): TheoryReading {
  let reading = readOperand(reader, about);
  while (reader.at("dot")) {
    reader.next();
    const label = readLabel(reader, "`.`");
    reading = change(reader, reading, label, `${reading.text}.${label.text}`, (theory) =>
      singleAxiom(theory, label.text),
    );
  }
  return reading;
}

function readOperand(reader: Reader, about: readonly RelationSymbol[] | null): TheoryReading {
  const token = reader.peek();
  if (token.kind === "open-brace") return readLiteral(reader, about);
  if (token.kind === "open") return readBracketed(reader);
  if (isSmtLib(token) && reader.peekAfter(1).kind === "open-brace")
    return reader.fail(
      "unexpected",
      token,
      "`smt-lib { … }` stands only after `define Name :=`, and by itself",
      "define it there, and use the name here",
    );
  if (token.kind === "word") {
    const isCall = reader.peekAfter(1).kind === "open";
    if (isCall && token.text === "converse") return readDual(reader, converseTheory);
    if (isCall && token.text === "complement") return readDual(reader, complementTheory);
    return readName(reader, token);
  }
  return reader.failExpected("a theory");
}

function readName(reader: Reader, name: Token): TheoryReading {
  const named = reader.names.find(name.text);
  const reading = (theory: Theory | null) => {
    reader.next();
    return { text: name.text, theory, from: name.from, to: name.to };
  };
  if (named?.kind === "theory") {
    const { theory } = named.definition;
    reader.charge(theory.axioms.length, name);
    return reading(theory);
  }
  if (named?.kind === "damaged") return reading(null);
  if (named !== null) {
    const suggestion =
      named.kind === "formula" && named.definition.parameters.length === 0
        ? `write \`{ ${name.text} }\` for the theory whose axiom it is`
        : null;
    reader.report(
      "wrong-kind",
      name,
      `${quote(name.text)} is ${kindText(named.kind)}, where a theory is expected`,
      suggestion,
    );
    return reading(null);
  }
  reportUnknownTheory(reader, name);
  return reading(null);
}

function reportUnknownTheory(reader: Reader, name: Token): void {
  const { names } = reader;
  // `Dense-mid`: a name may have hyphens, so that the sign needs spaces.
  for (let at = name.text.lastIndexOf("-"); at > 0; at = name.text.lastIndexOf("-", at - 1)) {
    const [theory, label] = [name.text.slice(0, at), name.text.slice(at + 1)];
    if (names.find(theory)?.kind !== "theory") continue;
    reader.report(
      "unknown-name",
      name,
      `there is no theory ${quote(name.text)}; a name may have hyphens, and so the sign \`-\` needs spaces`,
      `write \`${theory} - ${label.replaceAll("-", " - ")}\``,
    );
    return;
  }
  const near = names.nearest(name.text, ["theory"]);
  reader.report(
    "unknown-name",
    name,
    `there is no theory ${quote(name.text)}`,
    near !== null ? `write \`${near}\`` : `define it: \`define ${name.text} := { … }\``,
  );
}

function readBracketed(reader: Reader): TheoryReading {
  const mark = reader.mark;
  const open = reader.next();
  const inner = readInside(reader, open, mark);
  return { ...inner, text: `(${inner.text})`, from: open.from, to: reader.last.to };
}

function readDual(reader: Reader, dual: (theory: Theory) => Theory): TheoryReading {
  const word = reader.next();
  const mark = reader.mark;
  const open = reader.next();
  const inner = readInside(reader, open, mark);
  const place = { from: word.from, to: reader.last.to };
  const theory = inner.theory === null ? null : checkSize(reader, dual(inner.theory), place);
  return { text: `${word.text}(${inner.text})`, theory, ...place };
}

/** Reads a theory expression and the bracket that closes it. */
function readInside(reader: Reader, open: Token, mark: Reader["mark"]): TheoryReading {
  reader.enter(open);
  const { level } = reader;
  return reader.withLines(false, () => {
    let reading: TheoryReading;
    try {
      reading = readExpression(reader);
      reader.close(open, "`+`, `-`, `replacing` or `)`");
    } catch (error) {
      if (!(error instanceof Unreadable) || error.beyondBrackets || !reader.skipGroup(mark)) throw error;
      reading = { text: "", theory: null, from: open.from, to: reader.last.to };
    }
    reader.level = level - 1;
    return reading;
  });
}

// Literals

interface AxiomReading {
  readonly label: Token | null;
  /** Null after a mistake. Bare properties have the stand-in. */
  readonly axiom: UnsettledFormula | null;
}

function readLiteral(reader: Reader, about: readonly RelationSymbol[] | null): TheoryReading {
  const mistakes = reader.diagnostics.length;
  const open = reader.next();
  const { level, inTheory } = reader;
  const axioms = reader.withLines(true, () => {
    reader.inTheory = true;
    try {
      return readAxioms(reader, open, level);
    } finally {
      reader.inTheory = inTheory;
    }
  });
  const place = { from: open.from, to: reader.last.to };
  const text =
    axioms.length === 0
      ? "{}"
      : `{ ${axioms.map(({ label, axiom }) => (label === null ? "" : `${label.text}: `) + (axiom?.text ?? "")).join("; ")} }`;
  const repeated = reportRepeatedLabels(reader, axioms);
  if (repeated || reader.diagnostics.length > mistakes) return { text, theory: null, ...place };
  const formulas = settleAxioms(
    reader,
    axioms.map(({ axiom }) => axiom!),
    about,
  );
  if (formulas === null) return { text, theory: null, ...place };
  const theory = { axioms: labelled(axioms, formulas), fallback: reader.names.sole };
  return { text, theory: settle(reader, place, checkedTheory(theory)), ...place };
}

/** Says bare properties of the sole relation of the theory; null when that is not told. */
function settleAxioms(
  reader: Reader,
  axioms: readonly UnsettledFormula[],
  about: readonly RelationSymbol[] | null,
): readonly Formula[] | null {
  const bare = axioms.flatMap((axiom) => axiom.bare);
  const formulas = axioms.map(({ formula }) => formula);
  if (bare.length === 0) return formulas;
  if (about === null) return null;
  const relation = findSoleRelation(reader, bare, [...about, ...formulas.flatMap(declaredIn)]);
  return relation === null ? null : formulas.map((formula) => putRelation(formula, relation));
}

function readAxioms(reader: Reader, open: Token, level: number): readonly AxiomReading[] {
  const mark = reader.mark;
  const axioms: AxiomReading[] = [];
  for (;;) {
    const token = reader.peekAfter(0);
    if (token.kind === "semicolon") {
      reader.begin();
      reader.next();
    } else if (token.kind === "close-brace") {
      reader.begin();
      reader.next();
      return axioms;
    } else if (token.kind === "end" || isUnclosedAt(reader, token)) {
      reader.report("missing-bracket", open, "this `{` is not closed", "put in a `}` after the last axiom");
      throw new Unreadable(true);
    } else {
      reader.begin();
      axioms.push(readAxiom(reader, mark, level, axioms.length));
    }
  }
}

/** Whether a statement begins where an axiom is due. */
function isUnclosedAt(reader: Reader, token: Token): boolean {
  return (
    token.lineStart &&
    token.kind === "word" &&
    isStatementWord(token.text) &&
    reader.peekAfter(1).kind !== "colon"
  );
}

function readAxiom(reader: Reader, mark: Reader["mark"], level: number, before: number): AxiomReading {
  let label: Token | null = null;
  try {
    if (reader.peekAfter(1).kind === "colon") {
      label = reader.peek();
      if (label.kind !== "word") {
        reader.report(
          "not-a-name",
          label,
          `${quote(label.text)} cannot be the label of an axiom`,
          "a label begins with a letter and is no sign of the language",
        );
        label = null;
      }
      reader.next();
      reader.next();
      reader.crossLine();
    }
    refuseTheoryAsAxiom(reader);
    const axiom = readUnsettled(
      reader,
      label === null ? `axiom ${before + 1} of the theory` : `the axiom ${quote(label.text)}`,
    );
    if (!reader.at("end") && !reader.at("semicolon") && !reader.at("close-brace"))
      reader.failExpected(
        "an operator, `;` or `}`",
        reader.at("comma") ? "axioms stand apart by `;` or on lines of their own" : null,
      );
    return { label, axiom };
  } catch (error) {
    if (!(error instanceof Unreadable)) throw error;
    reader.level = level;
    reader.skipAxiom(mark);
    return { label, axiom: null };
  }
}

/** `{ Order; … }`: a theory is added with `+`, not listed among the axioms. */
function refuseTheoryAsAxiom(reader: Reader): void {
  const name = reader.peek();
  if (name.kind !== "word" || reader.names.find(name.text)?.kind !== "theory") return;
  if (reader.peekAfter(1).kind === "dot") return;
  reader.fail(
    "wrong-kind",
    name,
    `${quote(name.text)} is a theory, and no axiom`,
    `join theories with \`+\`: \`${name.text} + { … }\``,
  );
}

function reportRepeatedLabels(reader: Reader, axioms: readonly AxiomReading[]): boolean {
  const seen = new Set<string>();
  let repeated = false;
  for (const { label } of axioms) {
    if (label === null) continue;
    if (seen.has(label.text)) {
      repeated = true;
      reader.report(
        "label-twice",
        label,
        `two axioms of this theory have the label ${quote(label.text)}`,
        "give one of them another label",
      );
    }
    seen.add(label.text);
  }
  return repeated;
}

/** Gives labels to the axioms that have none: a1, a2, …, passing over those that the user gave. */
function labelled(readings: readonly AxiomReading[], formulas: readonly Formula[]): readonly Axiom[] {
  const taken = new Set(readings.map(({ label }) => label?.text));
  let number = 0;
  return readings.map(({ label }, index) => {
    const formula = formulas[index]!;
    if (label !== null) return { label: label.text, formula, named: true };
    do number += 1;
    while (taken.has(`a${number}`));
    return { label: `a${number}`, formula, named: false };
  });
}

// Making theories of theories

function join(reader: Reader, left: TheoryReading, right: TheoryReading): TheoryReading {
  const reading = { text: `${left.text} + ${right.text}`, from: left.from, to: right.to };
  if (left.theory === null || right.theory === null) return { ...reading, theory: null };
  const [first, second] = [left.theory, right.theory];
  const unnamed = second.axioms.filter((axiom) => !axiom.named).length;
  // What joining costs, labels being numbered on from 1.
  reader.charge(
    measureTheory(first).parts + measureTheory(second).parts + unnamed * first.axioms.length,
    right,
  );
  return { ...reading, theory: settle(reader, right, joinTheories(first, second), left.text, right.text) };
}

/** Applies a change that names a label of the theory. */
function change(
  reader: Reader,
  before: TheoryReading,
  label: Token,
  text: string,
  apply: (theory: Theory) => TheoryResult,
): TheoryReading {
  const reading = { text, from: before.from, to: reader.last.to };
  if (before.theory === null) return { ...reading, theory: null };
  const labels = before.theory.axioms.map((axiom) => axiom.label);
  if (!labels.includes(label.text)) {
    reportLabel(reader, label, before.text, labels);
    return { ...reading, theory: null };
  }
  return { ...reading, theory: settle(reader, reading, apply(before.theory)) };
}

/** The theory of a result, or null after its problem has been reported. */
function settle(
  reader: Reader,
  place: Place,
  result: TheoryResult,
  left = "the first",
  right = "the second",
): Theory | null {
  if ("theory" in result) return checkSize(reader, result.theory, place);
  reportProblem(reader, place, result.problem, left, right);
  return null;
}

function reportProblem(
  reader: Reader,
  place: Place,
  problem: TheoryProblem,
  left: string,
  right: string,
): void {
  switch (problem.kind) {
    case "label-twice":
      reader.report(
        "label-twice",
        place,
        `the label ${quote(problem.label)} stands for different axioms in ${quote(left)} and in ${quote(right)}`,
        `give one of them another label, or write \`replacing ${problem.label} by …\``,
      );
      return;
    case "places-differ":
      reader.report(
        "places-mixed",
        place,
        `${quote(problem.relation)} would occur with ${countOf(problem.places[0], "place")} and with ${countOf(problem.places[1], "place")} in one theory`,
        "define the older theory again, or give the relation another name",
      );
      return;
    case "no-such-label":
      reader.report(
        "unknown-label",
        place,
        `there is no axiom ${quote(problem.label)}`,
        `the labels are ${problem.known.map(quote).join(", ")}`,
      );
  }
}

function checkSize(reader: Reader, theory: Theory, place: Place): Theory | null {
  if (theory.axioms.length > MAX_AXIOMS) {
    reader.report(
      "theory-too-large",
      place,
      `this theory has ${theory.axioms.length} axioms; the most is ${MAX_AXIOMS}`,
      "join axioms with ∧",
    );
    return null;
  }
  const { parts, nesting } = measureTheory(theory);
  reader.charge(parts, place);
  if (nesting > MAX_NESTING) reader.failNested(place);
  return theory;
}
