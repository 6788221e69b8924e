/**
 * Whether a structure can be expanded by functions and added relations so that a formula over terms, or a set of
 * clauses, becomes true: the formula is unfolded over the points by definition, with a propositional variable for
 * each value of a function and each entry of a relation.
 */
import type { Application, FunctionSymbol, Term, TermFormula } from "../../lib/logic/clausal.ts";
import type { RelationSymbol } from "../../lib/logic/formula.ts";
import { Meter } from "../../lib/logic/meter.ts";
import type { NormalFormValue } from "../../lib/logic/normal-forms/result.ts";
import { Solver } from "../../lib/structures/sat/solver.ts";
import type { Interpretation } from "./brute-force.ts";

type Values = Readonly<Record<string, number>>;
/** A signed variable of the solver. */
type Lit = number;

export class Expansions {
  readonly #size: number;
  readonly #base: ReadonlySet<string>;
  readonly #open: Values;
  readonly #solver = new Solver();
  readonly #true: Lit;
  /** By relation and tuple. */
  readonly #entries = new Map<string, { variable: Lit; name: string; tuple: string }>();
  /** By function and tuple: for each point, the variable that says that it is the value. */
  readonly #functions = new Map<string, readonly Lit[]>();

  /**
   * @param base the relations that a structure interprets; others, and all functions, are to be found
   * @param open values of free variables
   */
  constructor(value: NormalFormValue, size: number, base: readonly RelationSymbol[], open: Values = {}) {
    this.#size = size;
    this.#base = new Set(base.map(({ name }) => name));
    this.#open = open;
    this.#true = this.#solver.newVariable();
    this.#solver.addClause([this.#true]);
    if (value.kind !== "clauses") this.#solver.addClause([this.#formula(value.formula, open)]);
    else
      for (const { literals } of value.clauses.clauses) {
        const parts = literals.map(
          ({ positive, atom }): TermFormula => (positive ? atom : { kind: "not", body: atom }),
        );
        const variables = [...new Set(literals.flatMap(({ atom }) => variablesOf(atom)))];
        for (const values of this.#assignments(variables))
          this.#solver.addClause(parts.map((part) => this.#formula(part, values)));
      }
  }

  /** Whether the structure can be expanded so that the value is true. */
  exist(structure: Interpretation): boolean {
    const assumptions = [...this.#entries.values()]
      .filter(({ name }) => this.#base.has(name))
      .map(({ variable, name, tuple }) => (structure.get(name)!.has(tuple) ? variable : -variable));
    const meter = new Meter();
    const outcome = this.#solver.solve(meter, assumptions);
    if (outcome === "ended") throw new Error("too much work");
    return outcome === "satisfiable";
  }

  *#assignments(variables: readonly string[], values: Values = {}): Generator<Values> {
    const [first, ...rest] = variables;
    if (first === undefined) yield values;
    else
      for (let point = 0; point < this.#size; point += 1)
        yield* this.#assignments(rest, { ...values, [first]: point });
  }

  #formula(formula: TermFormula, values: Values): Lit {
    switch (formula.kind) {
      case "true":
        return this.#true;
      case "false":
        return -this.#true;
      case "not":
        return -this.#formula(formula.body, values);
      case "and":
        return this.#and(formula.parts.map((part) => this.#formula(part, values)));
      case "or":
        return this.#or(formula.parts.map((part) => this.#formula(part, values)));
      case "implies":
        return this.#or([-this.#formula(formula.left, values), this.#formula(formula.right, values)]);
      case "iff": {
        const [a, b] = [this.#formula(formula.left, values), this.#formula(formula.right, values)];
        return this.#and([this.#or([-a, b]), this.#or([a, -b])]);
      }
      case "forall":
      case "exists": {
        const parts = Array.from({ length: this.#size }, (_, point) =>
          this.#formula(formula.body, { ...values, [formula.variable]: point }),
        );
        return formula.kind === "forall" ? this.#and(parts) : this.#or(parts);
      }
      case "equal": {
        const [left, right] = [this.#term(formula.left, values), this.#term(formula.right, values)];
        return this.#or(left.map((lit, point) => this.#and([lit, right[point]!])));
      }
      case "atom": {
        const cases = this.#tuples(formula.args.map((arg) => this.#term(arg, values)));
        return this.#or(
          cases.map(({ lit, tuple }) => this.#and([lit, this.#entry(formula.relation.name, tuple.join())])),
        );
      }
    }
  }

  /** For each point, whether it is the value of the term. */
  #term(term: Term, values: Values): readonly Lit[] {
    if (typeof term === "string") return this.#point(values[term]);
    const { origin } = term.symbol;
    if (origin.kind === "parameter") return this.#point(this.#open[origin.variable]);
    const cases = this.#tuples(term.args.map((arg) => this.#term(arg, values)));
    return Array.from({ length: this.#size }, (_, point) =>
      this.#or(cases.map(({ lit, tuple }) => this.#and([lit, this.#valuesOf(term, tuple)[point]!]))),
    );
  }

  #point(value: number | undefined): readonly Lit[] {
    if (value === undefined) throw new Error("a variable has no value");
    return Array.from({ length: this.#size }, (_, point) => (point === value ? this.#true : -this.#true));
  }

  #tuples(options: readonly (readonly Lit[])[]): { lit: Lit; tuple: number[] }[] {
    let cases: { lit: Lit; tuple: number[] }[] = [{ lit: this.#true, tuple: [] }];
    for (const option of options)
      cases = cases.flatMap(({ lit, tuple }) =>
        option.flatMap((one, point) => {
          const both = this.#and([lit, one]);
          return both === -this.#true ? [] : [{ lit: both, tuple: [...tuple, point] }];
        }),
      );
    return cases;
  }

  #entry(name: string, tuple: string): Lit {
    const key = `${name} ${tuple}`;
    const known = this.#entries.get(key);
    if (known !== undefined) return known.variable;
    const variable = this.#solver.newVariable();
    this.#entries.set(key, { variable, name, tuple });
    return variable;
  }

  #valuesOf({ symbol }: Application, tuple: readonly number[]): readonly Lit[] {
    const key = `${symbol.name} ${tuple.join()}`;
    const known = this.#functions.get(key);
    if (known !== undefined) return known;
    const values = Array.from({ length: this.#size }, () => this.#solver.newVariable());
    this.#solver.addClause(values);
    values.forEach((one, index) => {
      for (const other of values.slice(0, index)) this.#solver.addClause([-one, -other]);
    });
    this.#functions.set(key, values);
    return values;
  }

  #and(parts: readonly Lit[]): Lit {
    return -this.#or(parts.map((part) => -part));
  }

  #or(parts: readonly Lit[]): Lit {
    const open = [...new Set(parts)].filter((part) => part !== -this.#true);
    if (open.includes(this.#true)) return this.#true;
    if (open.length === 0) return -this.#true;
    if (open.length === 1) return open[0]!;
    const gate = this.#solver.newVariable();
    this.#solver.addClause([-gate, ...open]);
    for (const part of open) this.#solver.addClause([gate, -part]);
    return gate;
  }
}

function variablesOf(atom: TermFormula & { kind: "atom" | "equal" }): string[] {
  const inTerm = (term: Term): string[] => (typeof term === "string" ? [term] : term.args.flatMap(inTerm));
  return (atom.kind === "atom" ? atom.args : [atom.left, atom.right]).flatMap(inTerm);
}

/** All function symbols in a formula over terms. */
export function functionsIn(formula: TermFormula): FunctionSymbol[] {
  const inTerm = (term: Term): FunctionSymbol[] =>
    typeof term === "string" ? [] : [term.symbol, ...term.args.flatMap(inTerm)];
  switch (formula.kind) {
    case "atom":
      return formula.args.flatMap(inTerm);
    case "equal":
      return [formula.left, formula.right].flatMap(inTerm);
    case "not":
    case "forall":
    case "exists":
      return functionsIn(formula.body);
    case "and":
    case "or":
      return formula.parts.flatMap(functionsIn);
    case "implies":
    case "iff":
      return [...functionsIn(formula.left), ...functionsIn(formula.right)];
    default:
      return [];
  }
}
