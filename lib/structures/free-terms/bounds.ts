/**
 * What sentences say of the elements that they say exist. As in Skolem form (Skolem 1920), an ∃ names the value of a
 * constructor at what the ∀ around it name; a sentence like ∀x ∀y ∃z ∀w (Rwz ↔ φ) then says where R holds of an element
 * and such a value, and other sentences say where it must or may.
 */
import {
  atomOf,
  atomTerms,
  changeTerms,
  type FormulaRecord,
  freeVariables,
  type Growth,
  type LiteralRecord,
  partsOf,
  substitute,
  type TermFormulaRecord,
  type TermRecord,
  withParts,
} from "../../logic/records/formulas.ts";
import { junction, negationNormalForm } from "../../logic/records/made-formulas.ts";

/** Where a relation must hold, or may hold at most, of elements and the value of a constructor. */
export interface Bound {
  readonly relation: string;
  /** At which place, counted from 0, the value stands. */
  readonly on: number;
  readonly side: "lower" | "upper";
  /**
   * Without quantifiers. Its variables are {@link othersOf} for the other places, and the arguments of the constructor; it
   * may speak of any relation and constructor.
   */
  readonly formula: TermFormulaRecord;
}

/** A constructor that an ∃ asks for. */
export interface Wanted {
  /** A number. */
  readonly name: string;
  readonly args: readonly string[];
  readonly bounds: readonly Bound[];
}

/** The variables at the other places of a relation of so many places. */
export function othersOf(places: number): readonly string[] {
  return places === 2 ? ["w"] : Array.from({ length: places - 1 }, (_, place) => `w${place + 1}`);
}

/** The names of the arguments of a constructor. */
function argumentNames(places: number): readonly string[] {
  return Array.from({ length: places }, (_, place) => (places <= 3 ? "xyz"[place]! : `x${place + 1}`));
}

/**
 * The constructors that sentences ask for, in the order in which they are met; those of which the same is said are one.
 * @param growth counts the parts of formulas that are made
 */
export function constructorsOf(sentences: readonly FormulaRecord[], growth: Growth): readonly Wanted[] {
  const reader = new SkolemReader(growth);
  const clauses = sentences.flatMap((sentence) => reader.clausesOf(sentence));
  const all = reader.constructors.map(([name, args]): Wanted => {
    const bounds = clauses.flatMap((clause) => boundsOf(clause, name, args, growth));
    return { name, args: argumentNames(args.length), bounds };
  });
  return mergeAlike(all, growth);
}

class SkolemReader {
  /** With the variables that are their arguments. */
  readonly constructors: (readonly [string, readonly string[]])[] = [];
  readonly #growth: Growth;
  #variables = 0;

  constructor(growth: Growth) {
    this.#growth = growth;
  }

  /** Formulas without quantifiers that say together, for all values of their variables, what the sentence says. */
  clausesOf(sentence: FormulaRecord): readonly TermFormulaRecord[] {
    return this.#conjuncts(this.#skolemise(negationNormalForm(sentence, true, this.#growth)));
  }

  #skolemise(formula: TermFormulaRecord): TermFormulaRecord {
    this.#growth.add();
    switch (formula[0]) {
      case "forall": {
        this.#variables += 1;
        const name = `v${this.#variables}`;
        return this.#skolemise(substitute(formula[2], new Map([[formula[1], name]]), this.#growth));
      }
      case "exists": {
        const args = [...freeVariables(formula)].sort((a, b) => Number(a.slice(1)) - Number(b.slice(1)));
        const name = `${this.constructors.length}`;
        this.constructors.push([name, args]);
        return this.#skolemise(
          substitute(formula[2], new Map([[formula[1], [name, ...args]]]), this.#growth),
        );
      }
      case "and":
      case "or":
        return withParts(
          formula,
          partsOf(formula).map((part) => this.#skolemise(part)),
        );
      default:
        return formula;
    }
  }

  #conjuncts(formula: TermFormulaRecord): readonly TermFormulaRecord[] {
    return formula[0] === "and" ? partsOf(formula).flatMap((part) => this.#conjuncts(part)) : [formula];
  }
}

function disjuncts(formula: TermFormulaRecord): readonly TermFormulaRecord[] {
  return formula[0] === "or" ? partsOf(formula).flatMap(disjuncts) : [formula];
}

/** What a clause, the disjunction of a literal about the value of a constructor and of others, says of that relation. */
function boundsOf(
  clause: TermFormulaRecord,
  name: string,
  args: readonly string[],
  growth: Growth,
): readonly Bound[] {
  const parts = disjuncts(clause);
  for (const [index, part] of parts.entries()) {
    const atom = part[0] === "is" || part[0] === "not" ? atomOf(part as LiteralRecord) : null;
    if (atom?.[0] !== "is") continue;
    const terms = atomTerms(atom);
    for (const [on, value] of terms.entries()) {
      if (typeof value === "string" || value[0] !== name) continue;
      const others = othersOf(terms.length);
      const names = new Map(args.map((arg, place) => [arg, argumentNames(args.length)[place]!]));
      const conditions: TermFormulaRecord[] = [];
      terms
        .filter((_, place) => place !== on)
        .forEach((term, place) => {
          if (typeof term === "string" && !names.has(term)) names.set(term, others[place]!);
          else conditions.push(["=", others[place]!, term]);
        });
      const rest = junction("or", parts.toSpliced(index, 1));
      const isLower = part[0] === "is";
      const said: TermFormulaRecord = isLower
        ? junction("and", [...conditions, negationNormalForm(rest, false, growth)])
        : junction("or", [...conditions.map((one): TermFormulaRecord => ["not", one]), rest]);
      // Something is said of all values of another variable: that is no definition.
      if (freeVariables(said).some((variable) => !names.has(variable) && !others.includes(variable)))
        continue;
      const formula = substitute(said, names, growth);
      return [{ relation: atom[1], on, side: isLower ? "lower" : "upper", formula }];
    }
  }
  return [];
}

/** One constructor in place of all of which the same is said, if anything is. */
function mergeAlike(all: readonly Wanted[], growth: Growth): readonly Wanted[] {
  const representatives = new Map<string, string>();
  const kept = new Map<string, Wanted>();
  for (const wanted of all) {
    const text = JSON.stringify([wanted.args, wanted.bounds]);
    const same = wanted.bounds.length === 0 ? undefined : kept.get(text);
    representatives.set(wanted.name, same?.name ?? wanted.name);
    if (same === undefined) kept.set(wanted.bounds.length === 0 ? wanted.name : text, wanted);
  }
  return [...kept.values()].map((wanted) => ({
    ...wanted,
    bounds: wanted.bounds.map((bound) => ({
      ...bound,
      formula: renameConstructors(bound.formula, representatives, growth),
    })),
  }));
}

/** The formula with other names for constructors; those without one keep theirs. */
export function renameConstructors(
  formula: TermFormulaRecord,
  names: ReadonlyMap<string, string>,
  growth: Growth,
): TermFormulaRecord {
  growth.add();
  const rename = (term: TermRecord): TermRecord => {
    if (typeof term === "string") return term;
    const [name, ...args] = term;
    return [names.get(name) ?? name, ...args.map(rename)];
  };
  if (formula[0] === "is" || formula[0] === "=") return changeTerms(formula, rename);
  return withParts(
    formula,
    partsOf(formula).map((part) => renameConstructors(part, names, growth)),
  );
}
