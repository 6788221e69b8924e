/** Giving names to parts of a formula, so that its clauses stay few. */
import type { DefinedRelation } from "../clausal.ts";
import { join, quantifyAll } from "../clausal-formulas.ts";
import { and, type Formula, freeVariables, iff, not, or, partsOf, type Variable } from "../formula.ts";
import { renameApart } from "./prenex.ts";
import { toSimpleMiniscopedForm } from "./prepare.ts";
import type { Limits } from "./result.ts";
import { type Plug, rewriteParts, type StepRecorder } from "./steps.ts";
import type { SymbolNames } from "./symbols.ts";

export interface Named {
  /** Miniscoped: the formula with relations in place of parts, and a sentence for each of them that defines it. */
  readonly formula: Formula;
  readonly definitions: readonly DefinedRelation[];
}

/** A relation for each part named, and what it says. */
interface Definition {
  readonly relation: DefinedRelation;
  readonly sentence: Formula;
}

/**
 * Names parts of a formula. A side of ↔ that contains ↔ itself gets a relation that is equivalent to it (Tseitin 1968),
 * so that none is written twice over and over. In the miniscoped negation normal form of what comes out, a part of a
 * disjunction gets a relation that implies it (Plaisted & Greenbaum 1986) where that makes clauses fewer (Nonnengart &
 * Weidenbach 2001) or keeps many literals from being copied. The relation has the free variables of the part as
 * arguments, without those that are free in the whole.
 * @param taken variables that no quantifier of the result is to have
 * @throws FormTooLarge
 */
export function nameParts(
  formula: Formula,
  names: SymbolNames,
  taken: ReadonlySet<Variable>,
  limits: Limits,
  recorder: StepRecorder,
): Named {
  const fixed = new Set([...freeVariables(formula), ...taken]);
  const naming = new Naming(names, fixed, recorder);
  const sides = hasNestedEquivalence(formula)
    ? naming.nameSides(renameApart(formula, recorder, taken))
    : formula;
  const prepared = toSimpleMiniscopedForm(sides, limits, recorder);
  const named = naming.nameConjunctions(renameApart(prepared, recorder, taken));
  return { formula: named, definitions: naming.definitions.map(({ relation }) => relation) };
}

/** How many clauses a formula comes to, and how many literals are in them; upper bounds, perhaps infinite. */
interface ClauseCount {
  readonly clauses: number;
  readonly literals: number;
}

class Naming {
  readonly definitions: Definition[] = [];
  readonly #names: SymbolNames;
  readonly #fixed: ReadonlySet<Variable>;
  readonly #recorder: StepRecorder;
  /** By part, what {@link nameConjunctions} has counted. */
  readonly #counts = new Map<Formula, ClauseCount>();

  constructor(names: SymbolNames, fixed: ReadonlySet<Variable>, recorder: StepRecorder) {
    this.#names = names;
    this.#fixed = fixed;
    this.#recorder = recorder;
  }

  /** Leaves no ↔ inside a side of another. */
  nameSides(formula: Formula): Formula {
    return this.#collect(formula, (part, plug) => this.#nameSides(part, plug));
  }

  #nameSides(formula: Formula, plug: Plug): Formula {
    const rewritten = rewriteParts(formula, plug, (part, inner) => this.#nameSides(part, inner));
    if (rewritten.kind !== "iff") return rewritten;
    let { left, right } = rewritten;
    if (hasEquivalence(left)) left = this.#name(left, "both", (one) => plug(iff(one, right)));
    if (hasEquivalence(right)) right = this.#name(right, "both", (one) => plug(iff(left, one)));
    return iff(left, right);
  }

  /** Names parts of disjunctions in a formula in negation normal form. */
  nameConjunctions(formula: Formula): Formula {
    return this.#collect(formula, (part, plug) => this.#nameConjunctions(part, plug));
  }

  #nameConjunctions(formula: Formula, plug: Plug): Formula {
    const rewritten = rewriteParts(formula, plug, (part, inner) => this.#nameConjunctions(part, inner));
    if (rewritten.kind !== "or") return rewritten;
    const parts = [...rewritten.parts];
    for (;;) {
      const index = this.#worthNaming(parts);
      if (index === null) break;
      parts[index] = this.#name(parts[index]!, "implies", (one) => plug(join("or", parts.with(index, one))));
    }
    return join("or", parts);
  }

  /** The part of a disjunction that makes the most clauses, if naming it saves any; null else. */
  #worthNaming(parts: readonly Formula[]): number | null {
    const counts = parts.map((part) => this.#count(part));
    const most = counts.reduce((best, count, at) => (count.clauses > counts[best]!.clauses ? at : best), 0);
    const { clauses } = counts[most]!;
    if (clauses <= 1) return null;
    const others = counts.filter((_, at) => at !== most);
    const copies = others.reduce((product, count) => product * count.clauses, 1);
    const copied = others.reduce((sum, count) => sum + count.literals, 0);
    const saves = copies * clauses > copies + clauses || copied * clauses > 4 * (copied + clauses);
    return saves ? most : null;
  }

  #count(formula: Formula): ClauseCount {
    const known = this.#counts.get(formula);
    if (known !== undefined) return known;
    let count: ClauseCount;
    if (formula.kind === "forall" || formula.kind === "exists") count = this.#count(formula.body);
    else if (formula.kind === "and") {
      const parts = formula.parts.map((part) => this.#count(part));
      count = {
        clauses: parts.reduce((sum, part) => sum + part.clauses, 0),
        literals: parts.reduce((sum, part) => sum + part.literals, 0),
      };
    } else if (formula.kind === "or")
      count = formula.parts
        .map((part) => this.#count(part))
        .reduce((left, right) => ({
          clauses: left.clauses * right.clauses,
          literals: left.literals * right.clauses + right.literals * left.clauses,
        }));
    else count = { clauses: 1, literals: 1 };
    this.#counts.set(formula, count);
    return count;
  }

  #name(body: Formula, direction: "implies" | "both", plug: Plug): Formula {
    const parameters = freeVariables(body).filter((variable) => !this.#fixed.has(variable));
    const relation: DefinedRelation = {
      name: this.#names.relationName(),
      places: parameters.length,
      infix: false,
      origin: { kind: "definition", parameters, body, direction },
    };
    const atom: Formula = { kind: "atom", relation, args: parameters };
    const says = direction === "both" ? iff(atom, body) : or(not(atom), body);
    this.definitions.push({ relation, sentence: quantifyAll("forall", parameters, says) });
    this.#recorder.note("part named", "equisatisfiable", () => ({ kind: "formula", formula: plug(atom) }));
    return atom;
  }

  /** Rewrites a formula and adds the sentences of the definitions that came in on the way. */
  #collect(formula: Formula, rewrite: (part: Formula, plug: Plug) => Formula): Formula {
    const from = this.definitions.length;
    const sentences = () => this.definitions.slice(from).map(({ sentence }) => sentence);
    const whole: Plug = (part) => and(part, ...sentences());
    const result = whole(rewrite(formula, whole));
    this.#recorder.endPhase("parts named", () => ({ kind: "formula", formula: result }));
    return result;
  }
}

function hasEquivalence(formula: Formula): boolean {
  return formula.kind === "iff" || partsOf(formula).some(hasEquivalence);
}

function hasNestedEquivalence(formula: Formula): boolean {
  if (formula.kind === "iff" && (hasEquivalence(formula.left) || hasEquivalence(formula.right))) return true;
  return partsOf(formula).some(hasNestedEquivalence);
}
