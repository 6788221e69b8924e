/**
 * Terms, formulas over terms, and clauses.
 *
 * Function symbols do not occur in what a user writes: they come from Skolemisation and from free variables, and
 * each one carries where it comes from, as do the relations that a definitional form adds. A {@link Formula} is a
 * {@link TermFormula} as it stands, since a variable is a term.
 */
import type {
  Conditional,
  Junction,
  Negation,
  Quantified,
  RelationSymbol,
  Truth,
  Variable,
} from "./formula.ts";

/** A function symbol. Two symbols of one result are the same function when their names agree. */
export interface FunctionSymbol {
  /** Clashes with no relation, variable or other function symbol of the result it occurs in. */
  readonly name: string;
  /** How many arguments it takes; 0 for a constant. */
  readonly places: number;
  readonly origin: FunctionOrigin;
}

/** Where a function symbol comes from. */
export type FunctionOrigin =
  | {
      readonly kind: "skolem";
      /** The existential variable that the function stands for … */
      readonly variable: Variable;
      /** … which `formula` quantifies, as it was when the function came in; its bound variables are renamed apart. */
      readonly formula: TermFormula;
      /** What the function is applied to: distinct universal variables, free in `formula`. */
      readonly parameters: readonly Variable[];
    }
  /** A free variable of the formula that clauses were made of: it is fixed, while the variables of clauses are not. */
  | { readonly kind: "parameter"; readonly variable: Variable };

/** A relation that stands for a part of a formula. It may have no places at all. */
export interface DefinedRelation extends RelationSymbol {
  readonly origin: {
    readonly kind: "definition";
    /** As many distinct variables as the relation has places: the free variables of `body`, parameters left out. */
    readonly parameters: readonly Variable[];
    /** What the relation stands for. */
    readonly body: TermFormula;
    /**
     * What is said of the relation: that it implies the body, which is enough where it stands for a part that occurs
     * positively (Plaisted & Greenbaum 1986), or `both`: that they are equivalent (Tseitin 1968).
     */
    readonly direction: "implies" | "both";
  };
}

export interface Application {
  readonly symbol: FunctionSymbol;
  /** As many as the symbol has places. */
  readonly args: readonly Term[];
}
export type Term = Variable | Application;

export interface TermAtom {
  readonly kind: "atom";
  readonly relation: RelationSymbol | DefinedRelation;
  /** As many as the relation has places. */
  readonly args: readonly Term[];
}
export interface TermEquality {
  readonly kind: "equal";
  readonly left: Term;
  readonly right: Term;
}
export type TermFormula =
  | TermAtom
  | TermEquality
  | Truth
  | (Omit<Negation, "body"> & { readonly body: TermFormula })
  | (Omit<Junction, "parts"> & { readonly parts: readonly TermFormula[] })
  | (Omit<Conditional, "left" | "right"> & { readonly left: TermFormula; readonly right: TermFormula })
  | (Omit<Quantified, "body"> & { readonly body: TermFormula });

/** An atom or its negation. */
export interface Literal {
  readonly positive: boolean;
  readonly atom: TermAtom | TermEquality;
}

/**
 * A disjunction of literals under universal quantifiers for all its variables. Without literals it is false. No
 * literal occurs twice, and none with its negation.
 */
export interface Clause {
  readonly literals: readonly Literal[];
  /** Which of the formulas that the clauses were made of it comes from, from 0. */
  readonly source: number;
}

/** A conjunction of clauses. Variables of different clauses have nothing to do with each other. */
export interface ClauseSet {
  readonly clauses: readonly Clause[];
  /** Parameters, then Skolem functions in the order they came in; one may have dropped out of the clauses again. */
  readonly functions: readonly FunctionSymbol[];
  /** The relations that were added, in the order they came in; none in the plain form. */
  readonly definitions: readonly DefinedRelation[];
}
