/**
 * SMT-LIB 2.6 text as a theory: `define T := smt-lib { … }`. Read are sentences over one sort with relations alone;
 * what else SMT-LIB has is refused at its place. Definitions (`define-fun`, `let`) are unfolded.
 *
 * The relations that the text declares are declared for the notebook, as by `relation`; one that is there already
 * must have as many places.
 */
import type { RelationSymbol } from "../logic/formula.ts";
import { type Axiom, checkedTheory, type Theory } from "../logic/theory.ts";
import type { Place } from "./diagnostics.ts";
import { isRelationSign, type Token, wordLength } from "./lexer.ts";
import { checkNewName } from "./new-names.ts";
import { quote, type Reader, Unreadable } from "./reader.ts";
import { readSExpressions, type SExpression } from "./s-expressions.ts";
import { labelOfSymbol, nameOfSymbol } from "./smt-lib-symbols.ts";
import { SmtLibTerms } from "./smt-lib-terms.ts";
import { MAX_AXIOMS } from "./theories.ts";
import { countOf } from "./wording.ts";

export interface SmtLibReading {
  /** Null after a mistake. */
  readonly theory: Theory | null;
  /** The relations that the text declares and that are not in scope. */
  readonly declares: readonly RelationSymbol[];
}

/** Commands that change nothing of what is asserted. */
const IGNORED: ReadonlySet<string> = new Set(
  (
    "set-logic set-info set-option check-sat check-sat-assuming get-model get-value get-assertions get-assignment " +
    "get-info get-option get-proof get-unsat-core get-unsat-assumptions echo exit"
  ).split(" "),
);

/** Why a command is refused. */
const REFUSED: ReadonlyMap<string, string> = new Map([
  ["push", "a theory has all its axioms at once"],
  ["pop", "a theory has all its axioms at once"],
  ["reset", "a theory has all its axioms at once"],
  ["reset-assertions", "a theory has all its axioms at once"],
  ["define-fun-rec", "definitions must be explicit: use `define-fun`"],
  ["define-funs-rec", "definitions must be explicit: use `define-fun`"],
  ["declare-datatype", "there is one sort, and no functions on it"],
  ["declare-datatypes", "there is one sort, and no functions on it"],
  ["define-sort", "write the declared sort itself"],
]);

/** Reads the text between the braces of `smt-lib { … }`. */
export function readSmtLib(reader: Reader, raw: Token): SmtLibReading {
  return new ScriptReader(reader, raw).read();
}

type List = SExpression & { readonly kind: "list" };

class ScriptReader {
  readonly #reader: Reader;
  readonly #raw: Token;
  readonly #terms: SmtLibTerms;
  readonly #axioms: {
    readonly label: Token["text"] | null;
    readonly axiom: Omit<Axiom, "label" | "named">;
  }[] = [];
  readonly #labels = new Set<string>();
  readonly #relations: RelationSymbol[] = [];

  constructor(reader: Reader, raw: Token) {
    this.#reader = reader;
    this.#raw = raw;
    this.#terms = new SmtLibTerms(reader, (expression) => this.#placeOf(expression));
  }

  read(): SmtLibReading {
    const reader = this.#reader;
    const mistakes = reader.diagnostics.length;
    const { expressions, problems } = readSExpressions(this.#raw.text);
    for (const problem of problems)
      reader.report(problem.code, this.#placeOf(problem), problem.message, problem.suggestion);
    if (problems.length === 0)
      for (const expression of expressions) {
        const { level } = reader;
        try {
          this.#command(expression);
        } catch (error) {
          if (!(error instanceof Unreadable)) throw error;
        }
        reader.level = level;
      }
    if (reader.diagnostics.length > mistakes) return { theory: null, declares: this.#relations };
    const { names } = reader;
    const isNew = ({ name }: RelationSymbol) => names.find(name)?.kind !== "relation";
    // Without a declaration the relation `R` is there, and gone after the first one that does not name it.
    const declares = names.isDeclared
      ? this.#relations.filter(isNew)
      : this.#relations.some((relation) => isNew(relation) || relation.places !== 2)
        ? this.#relations
        : [];
    return { theory: this.#theory(), declares };
  }

  #theory(): Theory | null {
    let number = 0;
    const axioms = this.#axioms.map(({ label, axiom }): Axiom => {
      // Labels such as Twoplace gives are taken for its own, so that they can be numbered anew.
      if (label !== null) return { ...axiom, label, named: !/^a[1-9][0-9]*$/.test(label) };
      do number += 1;
      while (this.#labels.has(`a${number}`));
      return { ...axiom, label: `a${number}`, named: false };
    });
    if (axioms.length > MAX_AXIOMS) {
      this.#reader.report(
        "theory-too-large",
        this.#raw,
        `this theory has ${axioms.length} axioms; the most is ${MAX_AXIOMS}`,
      );
      return null;
    }
    const fallback = this.#relations.length === 1 ? this.#relations[0]! : null;
    const result = checkedTheory({ axioms, fallback });
    return "theory" in result ? result.theory : null;
  }

  /** Counts code points only when it is asked for them, which is when there is a mistake. */
  #placeOf({ start, end }: { readonly start: number; readonly end: number }): Place {
    const { from, text } = this.#raw;
    const before = (units: number) => from + [...text.slice(0, units)].length;
    return {
      get from() {
        return before(start);
      },
      get to() {
        return before(end);
      },
    };
  }

  #command(expression: SExpression): void {
    const reader: Reader = this.#reader;
    const place = this.#placeOf(expression);
    const head = expression.kind === "list" ? expression.items[0] : undefined;
    if (expression.kind !== "list" || head?.kind !== "symbol")
      reader.fail("unexpected", place, "expected a command in brackets, such as `(assert φ)`");
    const refusal = REFUSED.get(head.text);
    if (refusal !== undefined)
      reader.fail("smt-lib-refused", place, `${quote(head.text)} cannot be read here: ${refusal}`);
    if (head.text === "declare-sort") this.#declareSort(expression);
    else if (head.text === "declare-fun") this.#declareRelation(expression);
    else if (head.text === "declare-const") this.#declareConstant(expression);
    else if (head.text === "define-fun") this.#terms.define(expression);
    else if (head.text === "assert") this.#assert(expression);
    else if (!IGNORED.has(head.text))
      reader.fail(
        "smt-lib-refused",
        this.#placeOf(head),
        `${quote(head.text)} is no command that is read here`,
        "commands are `declare-sort`, `declare-fun`, `define-fun` and `assert`",
      );
  }

  #failForm(command: List, form: string): never {
    return this.#reader.fail(
      "unexpected",
      this.#placeOf(command),
      `expected \`${form}\`, found ${quote(this.#raw.text.slice(command.start, command.end))}`,
    );
  }

  #declareSort(command: List): void {
    const [, name, arity] = command.items;
    const isForm =
      command.items.length <= 3 &&
      name?.kind === "symbol" &&
      (arity === undefined || (arity.kind === "constant" && arity.text === "0"));
    if (!isForm) this.#failForm(command, "(declare-sort U 0)");
    const { sort } = this.#terms;
    if (sort !== null && sort !== name.text) {
      this.#terms.refused.add(name.text);
      this.#reader.fail(
        "smt-lib-refused",
        this.#placeOf(name),
        `there is one sort, ${quote(sort)}, and ${quote(name.text)} would be a second one`,
        `say with a relation of 1 place which elements belong to ${quote(name.text)}`,
      );
    }
    this.#terms.sort = name.text;
  }

  #declareConstant(command: List): void {
    const [, name] = command.items;
    if (name?.kind !== "symbol") this.#failForm(command, "(declare-fun R (U U) Bool)");
    this.#failConstant(name);
  }

  #failConstant(name: SExpression & { kind: "symbol" }): never {
    return this.#reader.fail(
      "smt-lib-refused",
      this.#placeOf(name),
      `${quote(name.text)} is a constant, and formulas here have relations alone`,
      "say ∃ in an axiom, or use a relation of 1 place that holds of one element",
    );
  }

  #declareRelation(command: List): void {
    const [, name, domain, range] = command.items;
    if (command.items.length !== 4 || name?.kind !== "symbol" || domain?.kind !== "list")
      this.#failForm(command, "(declare-fun R (U U) Bool)");
    for (const sort of domain.items) this.#terms.checkSort(sort);
    if (range?.kind !== "symbol" || range.text !== "Bool") {
      if (domain.items.length === 0) this.#failConstant(name);
      this.#reader.fail(
        "smt-lib-refused",
        this.#placeOf(name),
        `${quote(name.text)} is a function, and formulas here have relations alone`,
        `use a relation of ${countOf(domain.items.length + 1, "place")} that is right-unique and serial`,
      );
    }
    if (domain.items.length === 0)
      this.#reader.fail(
        "smt-lib-refused",
        this.#placeOf(name),
        `${quote(name.text)} is a relation of no places, and a relation here has one at least`,
        "use a relation of 1 place that holds of all elements or of none",
      );
    const relation = this.#relation(name, domain.items.length);
    if (!this.#terms.declare(name, relation)) return;
    this.#relations.push(relation);
  }

  /** The relation for a declaration; reports a name that cannot be one in cells, or is taken. */
  #relation(symbol: SExpression & { kind: "symbol" }, places: number): RelationSymbol {
    const reader = this.#reader;
    const name = nameOfSymbol(symbol.text).normalize("NFC");
    const place = this.#placeOf(symbol);
    const isSign = isRelationSign(name);
    if (!isSign && wordLength(name) !== name.length)
      reader.report(
        "not-a-name",
        place,
        `${quote(name)} cannot be the name of a relation in cells`,
        "take letters, digits, `_` and inner hyphens, beginning with a letter, or one mathematical symbol",
      );
    else checkNewName(reader, { text: name, kind: isSign ? "relation-sign" : "word", ...place }, "relation");
    const named = reader.names.find(name);
    if (named?.kind !== "relation" || (!reader.names.isDeclared && named.relation.places !== places))
      return { name, places, infix: isSign && places === 2 };
    if (named.relation.places === places) return named.relation;
    reader.report(
      "places-mixed",
      place,
      `${quote(name)} has ${countOf(named.relation.places, "place")} in the notebook, and ${places} here`,
      "give one of them another name",
    );
    return { ...named.relation, places };
  }

  #assert(command: List): void {
    const [, body] = command.items;
    if (command.items.length !== 2 || body === undefined) this.#failForm(command, "(assert φ)");
    const named = nameIn(body);
    let label: string | null = null;
    if (named !== null) {
      label = named.kind === "symbol" ? labelOfSymbol(named.text) : null;
      if (named.kind !== "symbol")
        this.#reader.report("unexpected", this.#placeOf(named), "expected a symbol after `:named`");
    }
    const formula = this.#terms.sentence(body);
    if (label !== null && this.#labels.has(label))
      this.#reader.report(
        "label-twice",
        this.#placeOf(named!),
        `two axioms would have the label ${quote(label)}`,
        "give one of them another name",
      );
    if (label !== null) this.#labels.add(label);
    this.#axioms.push({ label, axiom: { formula } });
  }
}

/** What follows `:named` in the annotation of a term; null when it has none. */
function nameIn(body: SExpression): SExpression | null {
  if (body.kind !== "list") return null;
  const [head] = body.items;
  if (head?.kind !== "symbol" || head.quoted || head.text !== "!") return null;
  const at = body.items.findIndex((item) => item.kind === "keyword" && item.text === ":named");
  return at < 0 ? null : (body.items[at + 1] ?? null);
}
