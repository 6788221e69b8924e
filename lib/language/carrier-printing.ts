/**
 * Structures as cell text, with the fewest brackets: `half-line where Rxy iff y = x + 1`. What is printed reads back as
 * the same definition, in each notation; in LaTeX words stand in `\text{…}`.
 */
import { atom } from "../logic/formula.ts";
import type {
  CarrierAtom,
  CarrierDescription,
  CarrierFormula,
  DefinedRelation,
  ElementTerm,
  ListedRelation,
  StructureDefinition,
  TuplesDescription,
} from "../logic/structure-definition.ts";
import { type Notation, printFormula, printTerm } from "./printer.ts";
import type { Scope } from "./statements.ts";
import { relationSigns, type SignKind, signOf } from "./tokens.ts";

/**
 * Prints a structure as it is written in a cell.
 * @param scope where the text is to be read; given, atoms that would read as one of its names are not juxtaposed
 */
export function printStructureDefinition(
  definition: StructureDefinition,
  notation: Notation,
  scope?: Scope,
): string {
  const carrier = printCarrier(definition.carrier, notation);
  if (definition.relations.length === 0) return carrier;
  const printer = new CarrierPrinter(notation);
  const said = definition.relations.map((defined) =>
    "tuples" in defined ? printer.table(defined, scope) : printer.definition(defined, scope),
  );
  const isListed = definition.carrier.kind === "points";
  return `${carrier}${printer.words("where")}${said.join(isListed ? printer.words("and") : `,${printer.words("and")}`)}`;
}

/** Prints a carrier as it is written in a cell, without its bounds: these follow from what is said of its elements. */
export function printCarrier(description: CarrierDescription, notation: Notation): string {
  return new CarrierPrinter(notation).carrier(description);
}

/** Prints `R(x,y) iff x < y`, one definition of several. */
export function printDefinedRelation(defined: DefinedRelation, notation: Notation, scope?: Scope): string {
  return new CarrierPrinter(notation).definition(defined, scope);
}

/** Prints a formula about elements of a carrier. */
export function printCarrierFormula(formula: CarrierFormula, notation: Notation): string {
  return new CarrierPrinter(notation).formula(formula);
}

/** How tightly the outermost sign of a formula binds, as in the printer of formulas. */
const BINDING = { iff: 1, implies: 2, or: 3, and: 4, unary: 5 } as const;

class CarrierPrinter {
  readonly #notation: Notation;

  constructor(notation: Notation) {
    this.#notation = notation;
  }

  // Words

  #word(word: string): string {
    return this.#notation === "latex" ? `\\text{${word}}` : word;
  }

  /** Words between others, with the space around them. */
  words(...words: readonly string[]): string {
    return [...words.map((word) => `${this.#space}${this.#word(word)}`), this.#space].join("");
  }

  get #space(): string {
    return this.#notation === "latex" ? "\\ " : " ";
  }

  /** Words and numbers in a row, with space between them. */
  #phrase(...parts: readonly (string | number)[]): string {
    return parts
      .map((part) => (typeof part === "number" ? String(part) : this.#word(part)))
      .join(this.#space);
  }

  // Carriers

  carrier(description: CarrierDescription): string {
    switch (description.kind) {
      case "points":
        return this.#phrase("points", description.size);
      case "dense-line":
        return description.colours === 1
          ? this.#word("dense-line")
          : this.#phrase("dense-line", "in", description.colours, "colours");
      case "integer-line":
      case "half-line":
      case "dense-tree":
        return this.#word(description.kind);
      case "generic":
        return this.#phrase("generic", description.of);
      case "boolean-algebra":
        if (description.zero) return this.#word("boolean-algebra");
        return description.top
          ? this.#phrase("boolean-algebra", "without", "zero")
          : this.#phrase("boolean-algebra", "without", "zero", "and", "top");
      case "forest": {
        const { rooted, branching } = description;
        const tree = rooted ? ["rooted", "tree"] : ["tree"];
        return this.#phrase(...tree, "with", branching, branching === 1 ? "child" : "children");
      }
      case "tuples":
        return this.#tuples(description);
      case "sum": {
        const parts = description.parts.map((part) => this.#component(part));
        return `${this.#phrase("sum", "of")}${this.#space}${parts.slice(0, -1).join(`,${this.#space}`)}${this.words("and")}${parts.at(-1)!}`;
      }
      case "product":
        return `${this.#component(description.inner)}${this.words("at", "each", "point", "of")}${this.#component(description.outer)}`;
    }
  }

  #component(description: CarrierDescription): string {
    return bracket(["tuples", "sum", "product"].includes(description.kind), this.carrier(description));
  }

  /** Copies and single points beside them, or else the lengths of the tuples. */
  #tuples({ over, widths }: TuplesDescription): string {
    const copies = widths.findIndex((width) => width !== 1);
    const copyCount = copies < 0 ? widths.length : copies;
    const points = widths.slice(copyCount);
    if (copyCount === 0 || points.some((width) => width !== 0))
      return `${this.#phrase("tuples", "of")}${this.#space}${widths.join(`,${this.#space}`)}${this.words("over")}${this.#component(over)}`;
    const many = `${this.#phrase(copyCount, copyCount === 1 ? "copy" : "copies", "of")}${this.#space}${this.#component(over)}`;
    if (points.length === 0) return many;
    const beside = this.#phrase("with", points.length, points.length === 1 ? "point" : "points");
    return `${many}${this.#space}${beside}`;
  }

  // Relations

  table({ relation, tuples }: ListedRelation, scope: Scope | undefined): string {
    const name = printFormula(atom(relation), this.#notation, scope);
    const [open, close] = this.#notation === "latex" ? ["\\{", "\\}"] : ["{", "}"];
    const listed = tuples.map((tuple) => (tuple.length === 1 ? String(tuple[0]) : `(${tuple.join(",")})`));
    return `${name}${this.words("is")}${open}${listed.length === 0 ? "" : ` ${listed.join(", ")} `}${close}`;
  }

  definition({ relation, variables, formula }: DefinedRelation, scope: Scope | undefined): string {
    const head = printFormula(atom(relation, ...variables), this.#notation, scope);
    return `${head}${this.words("iff")}${this.formula(formula)}`;
  }

  // Formulas

  formula(formula: CarrierFormula): string {
    return this.#operand(formula, BINDING.iff);
  }

  #sign(kind: SignKind): string {
    const sign = signOf(kind);
    if (this.#notation === "unicode") return sign.symbol;
    const spellings = this.#notation === "ascii" ? sign.ascii : sign.latex;
    return spellings[0] ?? sign.symbol;
  }

  #operand(formula: CarrierFormula, binding: number): string {
    switch (formula.kind) {
      case "true":
      case "false":
        return this.#sign(formula.kind);
      case "iff":
      case "implies": {
        const own = BINDING[formula.kind];
        const [left, right] = [this.#operand(formula.left, own + 1), this.#operand(formula.right, own)];
        return bracket(own < binding, `${left} ${this.#sign(formula.kind)} ${right}`);
      }
      case "or":
      case "and": {
        const own = BINDING[formula.kind];
        const parts = formula.parts.map((part) => this.#operand(part, own));
        return bracket(own < binding, parts.join(` ${this.#sign(formula.kind)} `));
      }
      case "not": {
        const { body } = formula;
        const isEquation = (body.kind === "compare" && body.relation === "=") || body.kind === "label";
        if (isEquation) return this.#atom(body, this.#sign("not-equal"));
        const gap = this.#notation === "latex" ? " " : "";
        return `${this.#sign("not")}${gap}${this.#operand(body, BINDING.unary)}`;
      }
      default:
        return this.#atom(formula, "=");
    }
  }

  /** @param equal how it is said that both sides are the same, or that they are not */
  #atom(said: CarrierAtom, equal: string): string {
    switch (said.kind) {
      case "label":
        return `${this.#word(said.name)}(${this.#term(said.of)}) ${equal} ${said.value}`;
      case "holds":
        return this.#applied(said.name, said.args);
      case "compare": {
        const sign = said.relation === "=" ? equal : said.relation === "<" ? "<" : this.#atMost;
        return `${this.#term(said.left)} ${sign} ${this.#term(said.right)}`;
      }
    }
  }

  get #atMost(): string {
    if (this.#notation === "ascii") return "<=";
    return this.#notation === "unicode" ? "≤" : relationSigns.find(({ symbol }) => symbol === "≤")!.latex[0]!;
  }

  #term(term: ElementTerm): string {
    switch (term.kind) {
      case "element": {
        const path = term.path.map((step) => `.${typeof step === "number" ? step : this.#word(step)}`);
        return `${printTerm(term.variable, this.#notation)}${path.join("")}`;
      }
      case "number":
        return String(term.value);
      case "shift":
        return `${this.#term(term.of)} ${term.by < 0 ? "-" : "+"} ${Math.abs(term.by)}`;
      case "apply":
        return this.#applied(term.name, term.args);
    }
  }

  #applied(name: string, args: readonly ElementTerm[]): string {
    const terms = args.map((term) => this.#term(term));
    return `${this.#word(name)}(${terms.join(this.#notation === "unicode" ? ", " : ",")})`;
  }
}

function bracket(needed: boolean, text: string): string {
  return needed ? `(${text})` : text;
}
