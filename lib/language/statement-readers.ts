/**
 * One reader for each statement, by its first word. To add a statement: its type in statements.ts, its help in
 * help.ts, its reader here.
 */
import type { RelationSymbol, Variable } from "../logic/formula.ts";
import type { NormalFormName } from "../logic/normal-forms/result.ts";
import { LARGEST_DOMAIN } from "../logic/structure-definition.ts";
import { MOST_MINIMISED } from "../logic/theory.ts";
import { carrierWords } from "./carriers.ts";
import { checkInterpreted, readClaim, readConclusion, relationsAbout } from "./claims.ts";
import { readClosed, readOpen } from "./formulas.ts";
import { normalFormHelp } from "./help.ts";
import { isSmtLib, type Token } from "./lexer.ts";
import { isVariable, type NameKind } from "./names.ts";
import { nearestName } from "./nearest.ts";
import { checkNewName, failName } from "./new-names.ts";
import { readWhole } from "./numbers.ts";
import { readOptions } from "./options.ts";
import { quote, type Reader, Unreadable } from "./reader.ts";
import { readSmtLib, type SmtLibReading } from "./smt-lib-reader.ts";
import type { Definition, NamedTheory, Statement, StatementKind, WrittenFormat } from "./statements.ts";
import { isStructureAhead, readStructure } from "./structures.ts";
import { expressionAhead } from "./subjects.ts";
import { readTheory } from "./theories.ts";
import { countOf } from "./wording.ts";

type WithoutBase<T> = T extends unknown ? Omit<T, "from" | "to" | "text"> : never;
/** A statement without its source. */
export type StatementBody = WithoutBase<Statement>;

/** A name that the statement binds even if it has a mistake, so that its uses are not mistakes on top of that. */
export interface Binding {
  readonly name: string;
  readonly as: NameKind | null;
}

/** Reads a statement after its first word; null after a mistake. Adds to `bindings` what it will bind. */
export type StatementReader = (reader: Reader, bindings: Binding[]) => StatementBody | null;

/** The most places that a relation may have. */
const MOST_PLACES = 100;

export const statementReaders: Readonly<Record<StatementKind, StatementReader>> = {
  relation: readRelation,
  define: readDefine,
  describe: readDescribe,
  derive: readDerive,
  claim: (reader) => readStatedClaim(reader, "claim"),
  conjecture: (reader) => readStatedClaim(reader, "conjecture"),
  "check-finite": (reader) => readQuestion(reader, "check-finite"),
  dualise: (reader) => readQuestion(reader, "dualise"),
  compare: readCompare,
  independence: (reader) => readQuestion(reader, "independence"),
  minimise: readMinimise,
  models: readModels,
  count: readCount,
  normalise: readNormalise,
  write: readWrite,
};

// Declarations

function readRelation(reader: Reader, bindings: Binding[]): StatementBody | null {
  const relations: RelationSymbol[] = [];
  let sound = true;
  do {
    reader.crossLine();
    const name = reader.peek();
    if (name.kind !== "word" && name.kind !== "relation-sign") failName(reader, "relation");
    reader.next();
    const mistakes = reader.diagnostics.length;
    checkNewName(reader, name, "relation");
    if (reader.diagnostics.length === mistakes) bindings.push({ name: name.text, as: "relation" });
    const symbol = readDeclaration(reader, name);
    if (relations.some((relation) => relation.name === name.text))
      reader.report(
        "relation-twice",
        name,
        `${quote(name.text)} is declared twice in one statement`,
        "leave one out",
      );
    if (symbol === null || reader.diagnostics.length > mistakes) sound = false;
    else relations.push(symbol);
  } while (reader.accept("comma") !== null);
  return sound ? { kind: "relation", relations } : null;
}

/** Reads what stands after a name, up to the comma or the end; null after a mistake. */
function readDeclaration(reader: Reader, name: Token): RelationSymbol | null {
  try {
    const symbol = readSymbol(reader, name);
    if (reader.at("comma") || reader.at("semicolon") || reader.at("end")) return symbol;
    const near = nearestName(reader.peek().text, ["infix", "of"]);
    return reader.failExpected(
      "`of`, `infix`, `,` or the end of the statement",
      near === null ? null : `write \`${near}\``,
    );
  } catch (error) {
    if (!(error instanceof Unreadable)) throw error;
    reader.skipToComma();
    return null;
  }
}

/** Reads `of 3 places` and `infix` after a name. */
function readSymbol(reader: Reader, name: Token): RelationSymbol | null {
  let places: number | null = 2;
  let infix = false;
  for (;;) {
    if (reader.acceptWord("of") !== null) {
      places = readWhole(reader, "how many places the relation has");
      if (reader.acceptWord("places") === null && reader.acceptWord("place") === null)
        reader.failExpected("`places`", `write \`relation ${name.text} of ${places ?? 3} places\``);
    } else if (reader.acceptWord("infix") !== null) infix = true;
    else break;
  }
  if (places === null) return null;
  if (places > MOST_PLACES)
    reader.report(
      "size-too-large",
      name,
      `${quote(name.text)} would have ${places} places; the most is ${MOST_PLACES}`,
    );
  if (infix && places !== 2)
    reader.report(
      "places-differ",
      name,
      `${quote(name.text)} has ${countOf(places, "place")}, and only a relation of 2 places stands between its arguments`,
      "leave out `infix`",
    );
  return { name: name.text, places, infix };
}

function readDefine(reader: Reader, bindings: Binding[]): StatementBody | null {
  const name = reader.peek();
  if (name.kind !== "word") failName(reader, "definition");
  reader.next();
  const mistakes = reader.diagnostics.length;
  checkNewName(reader, name, "definition");
  const bind = (as: NameKind | null) => {
    bindings.length = 0;
    bindings.push({ name: name.text, as });
  };
  const isFree = reader.diagnostics.length === mistakes;
  if (isFree) bind(null);
  const parameters = reader.at("open") ? readParameters(reader, name) : null;
  if (isFree && parameters !== null) bind("formula");
  readAssign(reader);
  reader.crossLine();
  const kind = parameters !== null ? "formula" : expressionAhead(reader);
  if (isFree && kind !== "unknown") bind(kind);
  if (kind === "theory" && isSmtLib(reader.peek())) {
    const { theory, declares } = readSmtLibTheory(reader);
    for (const relation of declares) bindings.push({ name: relation.name, as: "relation" });
    if (theory === null || reader.diagnostics.length > mistakes) return null;
    const definition = { kind, name: name.text, theory };
    return declares.length === 0 ? { kind: "define", definition } : { kind: "define", definition, declares };
  }
  const definition = readDefinition(reader, name.text, parameters, kind);
  return definition === null || reader.diagnostics.length > mistakes ? null : { kind: "define", definition };
}

function readAssign(reader: Reader): void {
  const sign = reader.peek();
  if (sign.kind === "equal" || sign.kind === "colon") {
    reader.report("unexpected", sign, `expected \`:=\`, found ${quote(sign.text)}`, "write `:=`");
    reader.next();
    if (sign.kind === "colon") reader.accept("equal");
  } else reader.expect("assign", "a definition is written `define Name := …` or `define Name(x, y) := …`");
}

function readParameters(reader: Reader, name: Token): readonly Variable[] {
  reader.next();
  const parameters: Variable[] = [];
  reader.withLines(false, () => {
    if (reader.accept("close") !== null) {
      reader.report(
        "unexpected",
        reader.last,
        "expected a variable, found `)`",
        `write \`define ${name.text} := …\``,
      );
      return;
    }
    do {
      const token = reader.peek();
      if (token.kind !== "word" || !isVariable(token.text))
        reader.failExpected(
          `a variable as parameter of ${quote(name.text)}`,
          "variables are single lower-case letters with digits or primes",
        );
      reader.next();
      if (parameters.includes(token.text))
        reader.report(
          "variable-twice",
          token,
          `${quote(name.text)} has two parameters ${quote(token.text)}`,
          "give one of them another name",
        );
      parameters.push(token.text);
    } while (reader.accept("comma") !== null);
    reader.expect("close");
  });
  return parameters;
}

/** Reads `smt-lib { … }`. */
function readSmtLibTheory(reader: Reader): SmtLibReading {
  reader.next();
  const open = reader.next();
  const raw = reader.withLines(false, () => reader.next());
  const reading = readSmtLib(reader, raw);
  reader.withLines(false, () => {
    if (reader.accept("close-brace") === null)
      reader.fail("missing-bracket", open, "this `{` is not closed", "put in a `}` after the last command");
  });
  return reading;
}

function readDefinition(
  reader: Reader,
  name: string,
  parameters: readonly Variable[] | null,
  kind: ReturnType<typeof expressionAhead>,
): Definition | null {
  switch (kind) {
    case "theory": {
      const theory = readTheory(reader);
      return theory === null ? null : { kind, name, theory: theory.theory };
    }
    case "structure": {
      const structure = readStructure(reader);
      return structure === null ? null : { kind, name, structure: structure.structure };
    }
    case "formula": {
      if (reader.at("end") && parameters === null) reader.failExpected("a theory, a structure or a formula");
      const alternative = (free: readonly Variable[]) =>
        `add parameters: \`define ${name}(${[...(parameters ?? []), ...free].join(", ")}) := …\``;
      const body = readClosed(reader, `the definition of ${quote(name)}`, {
        parameters: parameters ?? [],
        alternative,
      });
      return body === null ? null : { kind, name, parameters: parameters ?? [], body: body.formula };
    }
    case "relation":
      return failRelation(reader, "a theory, a structure or a formula");
    case "unknown":
      return readUnknown(reader);
  }
}

function failRelation(reader: Reader, expected: string): never {
  const token = reader.peek();
  return reader.fail(
    "wrong-kind",
    token,
    `${quote(token.text)} is a relation, where ${expected} is expected`,
    "write a formula with its arguments",
  );
}

/** Reports a name that could be of any kind; null. */
function readUnknown(reader: Reader): null {
  const name = reader.next();
  if (reader.names.find(name.text)?.kind === "damaged") return null;
  const near =
    reader.names.nearest(name.text, ["relation", "formula", "theory", "structure"]) ??
    nearestName(name.text, carrierWords);
  reader.report(
    "unknown-name",
    name,
    `${quote(name.text)} is not defined`,
    near === null ? null : `write \`${near}\``,
  );
  return null;
}

// Questions

function readDescribe(reader: Reader): StatementBody | null {
  const token = reader.peek();
  const kind = expressionAhead(reader);
  switch (kind) {
    case "relation": {
      reader.next();
      const named = reader.names.find(token.text);
      return named?.kind === "relation"
        ? { kind: "describe", subject: { kind: "relation", relation: named.relation } }
        : null;
    }
    case "theory": {
      const theory = readTheory(reader);
      return theory === null ? null : { kind: "describe", subject: { kind: "theory", theory } };
    }
    case "structure": {
      const structure = readStructure(reader);
      return structure === null ? null : { kind: "describe", subject: { kind: "structure", structure } };
    }
    case "formula": {
      if (reader.at("end")) reader.failExpected("what is to be described: a name or an expression");
      const named = token.kind === "word" ? reader.names.find(token.text) : null;
      const { kind: after, from } = reader.peekAfter(1);
      const isBare = after === "end" || after === "semicolon" || reader.peekAfter(1).lineStart;
      if (named?.kind === "formula" && isBare && from >= token.to) {
        reader.next();
        return { kind: "describe", subject: { kind: "formula", definition: named.definition } };
      }
      const sentence = readClosed(reader, "the sentence");
      return sentence === null ? null : { kind: "describe", subject: { kind: "sentence", sentence } };
    }
    case "unknown":
      return readUnknown(reader);
  }
}

function readDerive(reader: Reader): StatementBody | null {
  if (isStructureAhead(reader))
    reader.fail(
      "wrong-kind",
      reader.peek(),
      `${quote(reader.peek().text)} is a structure, and \`derive\` asks about a theory`,
      "write `claim A ⊨ φ` for a structure A",
    );
  const premises = readTheory(reader);
  if (reader.at("does-not-entail"))
    reader.failExpected("`⊨`", "write `claim T ⊭ φ`, or `derive T ⊨ φ`: it gives the countermodel");
  reader.expect("entails");
  const conclusion = readConclusion(reader, relationsAbout(premises));
  const options = readOptions(reader);
  return premises === null || conclusion === null ? null : { kind: "derive", premises, conclusion, options };
}

function readStatedClaim(reader: Reader, kind: "claim" | "conjecture"): StatementBody | null {
  const claim = readClaim(reader);
  const options = readOptions(reader);
  return claim === null ? null : { kind, claim, options };
}

function readQuestion(
  reader: Reader,
  kind: "check-finite" | "dualise" | "independence" | "minimise",
): StatementBody | null {
  const theory = readTheory(reader);
  const options = readOptions(reader);
  return theory === null ? null : { kind, theory, options };
}

function readMinimise(reader: Reader): StatementBody | null {
  const first = reader.peek();
  const statement = readQuestion(reader, "minimise");
  const axioms = statement !== null && "theory" in statement ? statement.theory.theory.axioms.length : 0;
  if (axioms <= MOST_MINIMISED) return statement;
  reader.report(
    "too-many-axioms",
    { from: first.from, to: reader.last.to },
    `expected a theory of at most ${MOST_MINIMISED} axioms, found ${axioms}: their sets are too many to go through`,
    "join axioms with ∧, or ask `independence T` first",
  );
  return null;
}

function readCompare(reader: Reader): StatementBody | null {
  const first = reader.peek();
  const theories: (NamedTheory | null)[] = [];
  do {
    reader.crossLine();
    theories.push(readTheory(reader));
  } while (reader.accept("comma") !== null);
  const options = readOptions(reader);
  if (theories.length === 1)
    reader.report(
      "unexpected",
      { from: first.from, to: reader.last.to },
      "expected two theories or more, found one",
      "write `compare T, U`",
    );
  const known = theories.filter((theory) => theory !== null);
  return known.length < theories.length ? null : { kind: "compare", theories: known, options };
}

function readModels(reader: Reader): StatementBody | null {
  const theory = readTheory(reader);
  reader.expectWord("of", "write `models T of size 4`");
  reader.expectWord("size", "write `models T of size 4`");
  const size = readWhole(reader, "how many points the models have", LARGEST_DOMAIN);
  const options = readOptions(reader);
  return theory === null || size === null ? null : { kind: "models", theory, size, options };
}

function readCount(reader: Reader): StatementBody | null {
  const theory = readTheory(reader);
  const mistakes = reader.diagnostics.length;
  let representatives = false;
  const options = readOptions(reader, {
    word: "with",
    read: () => {
      representatives = true;
      reader.expectWord("representatives", "write `with representatives`");
    },
  });
  if (options.upTo === null && reader.diagnostics.length === mistakes)
    reader.failExpected(
      "`up to n`: the largest number of points on which models are counted",
      "write `count T up to 5`",
    );
  return theory === null ? null : { kind: "count", theory, representatives, options };
}

// Forms, for people and for other programs

function readNormalise(reader: Reader): StatementBody | null {
  const subject = readOpen(reader);
  reader.expectWord("to", "write `normalise φ to prenex form`");
  const form = readForm(reader);
  reader.acceptWord("form");
  const steps = reader.acceptWord("with") !== null;
  if (steps) reader.expectWord("steps", "write `with steps`");
  return subject === null ? null : { kind: "normalise", subject, form, steps };
}

function readForm(reader: Reader): NormalFormName {
  const word = reader.peek();
  const form = normalFormHelp.find(
    ({ phrase }) => word.kind === "word" && phrase[0]!.toLowerCase() === word.text.toLowerCase(),
  );
  if (form === undefined) {
    const phrases = normalFormHelp.map(({ phrase }) => phrase.join(" "));
    // The conjunctive form is that of clauses; by its letters it is nearer to the disjunctive one.
    const near = reader.atWord("conjunctive") ? "clause" : nearestName(word.text, phrases);
    return reader.failExpected(
      "the name of a normal form",
      near === null ? `forms are ${phrases.map(quote).join(", ")}` : `write \`${near}\``,
    );
  }
  reader.next();
  for (const rest of form.phrase.slice(1)) reader.expectWord(rest, `write \`${form.phrase.join(" ")}\``);
  return form.name;
}

function readWrite(reader: Reader): StatementBody | null {
  if (isStructureAhead(reader)) return readWriteTruth(reader);
  const theory = readTheory(reader);
  const asks = reader.accept("entails") !== null;
  const conclusion = asks ? readConclusion(reader, relationsAbout(theory)) : null;
  if (reader.at("does-not-entail"))
    reader.failExpected("`⊨`", "what is written for `T ⊨ φ` settles `T ⊭ φ` too");
  reader.expectWord("as", "write `write T as SMT-LIB`");
  const format = readFormat(reader);
  if (theory === null || format === null || (asks && conclusion === null)) return null;
  return { kind: "write", subject: { kind: "theory", theory, conclusion }, format };
}

/** Reads `A ⊨ φ as SMT-LIB`, or a theory in place of φ. */
function readWriteTruth(reader: Reader): StatementBody | null {
  const structure = readStructure(reader);
  const hint = "of a structure a truth is written: `write A ⊨ φ as SMT-LIB`";
  if (reader.accept("entails") === null) reader.failExpected("`⊨` after a structure", hint);
  reader.crossLine();
  const first = reader.peek();
  const named = reader.names.find(first.text);
  const isTheory = first.kind === "open-brace" || named?.kind === "theory";
  const theory = isTheory ? readTheory(reader) : null;
  const relations = structure?.structure.relations.map(({ relation }) => relation) ?? null;
  const sentence = isTheory ? null : readConclusion(reader, relations);
  const place = { from: first.from, to: reader.last.to };
  reader.expectWord("as", hint);
  const word = reader.peek();
  const format = readFormat(reader);
  if (format?.kind === "dimacs")
    reader.report(
      "wrong-kind",
      word,
      "what is true in a structure is a problem of arithmetic, not of clauses",
      "write `as SMT-LIB`",
    );
  if (structure === null || format?.kind !== "smt-lib") return null;
  const sentences =
    theory !== null
      ? theory.theory.axioms.map(({ label, formula }) => ({ name: label, formula }))
      : sentence !== null
        ? [{ name: sentence.text.replaceAll(/\s+/g, " "), formula: sentence.formula }]
        : null;
  if (!sentences?.every(({ formula }) => checkInterpreted(reader, structure, formula, place))) return null;
  const asked = theory?.text ?? sentence!.text;
  return { kind: "write", subject: { kind: "structure", structure, sentences, asked }, format };
}

function readFormat(reader: Reader): WrittenFormat | null {
  const word = reader.peek();
  switch (word.kind === "word" ? word.text.toLowerCase() : "") {
    case "smt-lib":
      reader.next();
      return { kind: "smt-lib" };
    case "dimacs": {
      reader.next();
      const hint = "clauses are about a number of points: write `as DIMACS of size 5`";
      reader.expectWord("of", hint);
      reader.expectWord("size", hint);
      const size = readWhole(reader, "how many points the clauses are about", LARGEST_DOMAIN);
      return size === null ? null : { kind: "dimacs", size };
    }
    default:
      return reader.failExpected("`SMT-LIB` or `DIMACS of size n`");
  }
}
