/**
 * Formulas and theories as text, with the fewest brackets. What is printed reads back as the same formula wherever
 * the relations are declared; see the parameter `scope` for names that look like juxtaposed atoms.
 *
 * | notation | style                                                                                     |
 * | ---      | ---                                                                                       |
 * | unicode  | `∀x ∀y (Rxy → Ryx)`, `Between(x, y, z)`, `x ≺ y`: each quantifier by itself, without dot    |
 * | ascii    | `forall x y. R(x,y) -> R(y,x)`: quantifiers in lists, with a dot; names are as declared     |
 * | latex    | `\forall x\, \forall y\, (Rxy \to Ryx)`, `\mathit{Between}(x,y,z)`, `x_{1}'`, `x \prec y`   |
 */
import type { Term, TermFormula } from "../logic/clausal.ts";
import { type Formula, type RelationSymbol, relationsOf } from "../logic/formula.ts";
import type { Theory } from "../logic/theory.ts";
import type { Scope } from "./statements.ts";
import { relationSigns, type SignKind, signOf } from "./tokens.ts";

export type Notation = "unicode" | "ascii" | "latex";

/**
 * Prints a formula; with function symbols in it (`R(x, f(x))`) it cannot be read back.
 * @param scope where the text is to be read; given, atoms that would read as one of its names are not juxtaposed
 */
export function printFormula(formula: TermFormula, notation: Notation, scope?: Scope): string {
  return new Printer(notation, namesIn([formula], scope)).print(formula);
}

/** Prints a theory with the labels of its axioms, one on a line; reads back inside `{ }` as the same theory. */
export function printTheory(theory: Theory, notation: Notation, scope?: Scope): string {
  return axiomLines(theory, notation, scope).join("\n");
}

/** Prints a theory as a literal on one line: `{ irr: ∀x ¬Rxx; trans: … }`. */
export function printAxiomSet(theory: Theory, notation: Notation, scope?: Scope): string {
  const [open, close] = notation === "latex" ? ["\\{", "\\}"] : ["{", "}"];
  const axioms = axiomLines(theory, notation, scope);
  return axioms.length === 0 ? `${open}${close}` : `${open} ${axioms.join("; ")} ${close}`;
}

function axiomLines(theory: Theory, notation: Notation, scope?: Scope): readonly string[] {
  const printer = new Printer(
    notation,
    namesIn(
      theory.axioms.map((axiom) => axiom.formula),
      scope,
    ),
  );
  return theory.axioms.map(({ label, formula }) =>
    notation === "latex"
      ? `\\textit{${escapeName(label)}}\\colon\\; ${printer.print(formula)}`
      : `${label}: ${printer.print(formula)}`,
  );
}

/** Prints a term: a variable, or a function symbol with its arguments; a constant stands without brackets. */
export function printTerm(term: Term, notation: Notation): string {
  return new Printer(notation, new Set()).printTerm(term);
}

function namesIn(formulas: readonly TermFormula[], scope: Scope | undefined): ReadonlySet<string> {
  const names = new Set<string>(scope?.definitions.keys());
  for (const { name } of scope?.declared ?? []) names.add(name);
  for (const formula of formulas) for (const { name } of relationsOf(formula as Formula)) names.add(name); // Terms do not matter to it.
  return names;
}

/** How tightly the outermost sign of a formula binds; an operand is bracketed when it binds less than its place asks. */
const BINDING = { iff: 1, implies: 2, or: 3, and: 4, unary: 5 } as const;

class Printer {
  readonly #notation: Notation;
  readonly #names: ReadonlySet<string>;

  constructor(notation: Notation, names: ReadonlySet<string>) {
    this.#notation = notation;
    this.#names = names;
  }

  print(formula: TermFormula): string {
    return this.#operand(formula, BINDING.iff, true);
  }

  printTerm(term: Term): string {
    if (typeof term === "string") return this.#variable(term);
    const name = this.#functionName(term.symbol.name);
    return term.args.length === 0 ? name : `${name}(${this.#list(term.args)})`;
  }

  #sign(kind: SignKind): string {
    const sign = signOf(kind);
    if (this.#notation === "unicode") return sign.symbol;
    const spellings = this.#notation === "ascii" ? sign.ascii : sign.latex;
    return spellings[0] ?? sign.symbol;
  }

  /**
   * @param binding how tightly the place asks the formula to bind
   * @param isLast whether nothing of the formula around it follows before a bracket closes: then a quantifier with
   *   a dot needs no bracket
   */
  #operand(formula: TermFormula, binding: number, isLast: boolean): string {
    switch (formula.kind) {
      case "iff":
      case "implies": {
        const own = BINDING[formula.kind];
        const bracketed = own < binding;
        const left = this.#operand(formula.left, own + 1, false);
        const right = this.#operand(formula.right, own, bracketed || isLast);
        return bracket(bracketed, `${left} ${this.#sign(formula.kind)} ${right}`);
      }
      case "or":
      case "and": {
        const own = BINDING[formula.kind];
        const bracketed = own < binding;
        const end = formula.parts.length - 1;
        const parts = formula.parts.map((part, index) =>
          this.#operand(part, own, index === end && (bracketed || isLast)),
        );
        return bracket(bracketed, parts.join(` ${this.#sign(formula.kind)} `));
      }
      case "not":
        if (formula.body.kind === "equal")
          return this.#comparison(formula.body.left, this.#sign("not-equal"), formula.body.right);
        return `${this.#sign("not")}${this.#gap()}${this.#operand(formula.body, BINDING.unary, isLast)}`;
      case "forall":
      case "exists":
        return this.#quantified(formula, isLast);
      case "true":
      case "false":
        return this.#sign(formula.kind);
      case "equal":
        return this.#comparison(formula.left, "=", formula.right);
      case "atom":
        return this.#atom(formula.relation, formula.args);
    }
  }

  /** A LaTeX command needs space before a letter. */
  #gap(): string {
    return this.#notation === "latex" ? " " : "";
  }

  #quantified(formula: TermFormula & { kind: "forall" | "exists" }, isLast: boolean): string {
    const { kind } = formula;
    const variable = this.#variable(formula.variable);
    if (this.#notation === "unicode") return `${this.#sign(kind)}${variable} ${this.#unary(formula.body)}`;
    if (this.#notation === "latex") return `${this.#sign(kind)} ${variable}\\, ${this.#unary(formula.body)}`;
    // A variable may stand only once in a list.
    const list = [formula.variable];
    let body = formula.body;
    while (body.kind === kind && !list.includes(body.variable)) {
      list.push(body.variable);
      body = body.body;
    }
    const text = `${this.#sign(kind)} ${list.join(" ")}. ${this.#operand(body, BINDING.iff, true)}`;
    return bracket(!isLast, text);
  }

  #unary(body: TermFormula): string {
    return this.#operand(body, BINDING.unary, false);
  }

  #comparison(left: Term, sign: string, right: Term): string {
    return `${this.printTerm(left)} ${sign} ${this.printTerm(right)}`;
  }

  #atom(relation: RelationSymbol, args: readonly Term[]): string {
    const { name, infix } = relation;
    if (args.length === 0) return this.#relationName(name);
    const terms = args.map((term) => this.printTerm(term));
    if (infix && args.length === 2) return `${terms[0]} ${this.#relationSign(name)} ${terms[1]}`;
    const juxtaposed =
      this.#notation !== "ascii" &&
      [...name].length === 1 &&
      /^\p{L}/u.test(name) &&
      args.every((term) => typeof term === "string");
    if (juxtaposed && !this.#names.has(name + args.join(""))) return name + terms.join("");
    return `${this.#relationName(name)}(${this.#list(args)})`;
  }

  #list(args: readonly Term[]): string {
    return args.map((term) => this.printTerm(term)).join(this.#notation === "unicode" ? ", " : ",");
  }

  #functionName(name: string): string {
    if (this.#notation !== "latex") return name;
    return /^\p{L}[0-9]*'*$/u.test(name) ? this.#variable(name) : latexName(name);
  }

  #variable(variable: string): string {
    if (this.#notation !== "latex") return variable;
    return variable.replace(/[0-9]+/, (digits) => `_{${digits}}`);
  }

  #relationSign(name: string): string {
    if (this.#notation !== "latex") return name;
    const command = latexCommand(name);
    if (command !== undefined) return command;
    return `\\mathrel{${/^\p{L}/u.test(name) ? latexName(name) : name}}`;
  }

  #relationName(name: string): string {
    if (this.#notation !== "latex") return name;
    if (/^\p{L}/u.test(name)) return [...name].length === 1 ? name : latexName(name);
    return `\\mathord{${latexCommand(name) ?? name}}`;
  }
}

function latexCommand(symbol: string): string | undefined {
  return relationSigns.find((sign) => sign.symbol === symbol)?.latex[0];
}

/** A name of several letters: in math italics, or in text italics where a hyphen would come out as a minus. */
function latexName(name: string): string {
  return /^[A-Za-z0-9]*$/.test(name) ? `\\mathit{${name}}` : `\\textit{${escapeName(name)}}`;
}

function escapeName(name: string): string {
  return name.replaceAll("_", "\\_");
}

function bracket(needed: boolean, text: string): string {
  return needed ? `(${text})` : text;
}
