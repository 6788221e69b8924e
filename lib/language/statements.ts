/** What the statements of a cell come to once all names in them are resolved. */
import type { Formula, RelationSymbol, Variable } from "../logic/formula.ts";
import type { NormalFormName } from "../logic/normal-forms/result.ts";
import type { StructureDefinition } from "../logic/structure-definition.ts";
import type { Theory } from "../logic/theory.ts";
import type { Diagnostic, Place } from "./diagnostics.ts";

/** A theory expression: what it stands for, and how the user wrote it (`Dense - mid`). */
export interface NamedTheory {
  readonly text: string;
  readonly theory: Theory;
}

/** A structure, named or written out. */
export interface NamedStructure {
  readonly text: string;
  readonly structure: StructureDefinition;
}

/** A sentence, and how the user wrote it. */
export interface NamedSentence {
  readonly text: string;
  /** Closed, definitions unfolded. */
  readonly formula: Formula;
}

/** What `define` can bind a name to. */
export type Definition =
  | {
      readonly kind: "formula";
      readonly name: string;
      /** Distinct; empty for a sentence. Every free variable of the body is one of them. */
      readonly parameters: readonly Variable[];
      readonly body: Formula;
    }
  | { readonly kind: "theory"; readonly name: string; readonly theory: Theory }
  | { readonly kind: "structure"; readonly name: string; readonly structure: StructureDefinition };

/** What `claim` and `conjecture` can say. */
export type Claim =
  | { readonly kind: "entails"; readonly premises: NamedTheory; readonly conclusion: NamedSentence }
  | { readonly kind: "does-not-entail"; readonly premises: NamedTheory; readonly conclusion: NamedSentence }
  | { readonly kind: "true-in"; readonly structure: NamedStructure; readonly sentence: NamedSentence }
  | { readonly kind: "false-in"; readonly structure: NamedStructure; readonly sentence: NamedSentence }
  | { readonly kind: "consistent"; readonly theory: NamedTheory }
  | { readonly kind: "infinite-only"; readonly theory: NamedTheory }
  | { readonly kind: "no-finite-model"; readonly theory: NamedTheory }
  | { readonly kind: "independent"; readonly theory: NamedTheory }
  | { readonly kind: "weaker"; readonly left: NamedTheory; readonly right: NamedTheory }
  | { readonly kind: "equivalent"; readonly left: NamedTheory; readonly right: NamedTheory };

/** The trailing phrases `up to 8` and `within 50000 steps`; null where the user left one out. */
export interface Options {
  readonly upTo: number | null;
  readonly within: number | null;
}

interface StatementBase extends Place {
  /** The statement's source, comments and surrounding space removed. */
  readonly text: string;
}

export type Statement = StatementBase &
  (
    | { readonly kind: "relation"; readonly relations: readonly RelationSymbol[] }
    | {
        readonly kind: "define";
        readonly definition: Definition;
        /** The relations that SMT-LIB text declares on top of those in scope; absent for other definitions. */
        readonly declares?: readonly RelationSymbol[];
      }
    | { readonly kind: "describe"; readonly subject: DescribeSubject }
    | {
        readonly kind: "derive";
        readonly premises: NamedTheory;
        readonly conclusion: NamedSentence;
        readonly options: Options;
      }
    | { readonly kind: "claim" | "conjecture"; readonly claim: Claim; readonly options: Options }
    | { readonly kind: "check-finite"; readonly theory: NamedTheory; readonly options: Options }
    | { readonly kind: "dualise"; readonly theory: NamedTheory; readonly options: Options }
    | { readonly kind: "compare"; readonly theories: readonly NamedTheory[]; readonly options: Options }
    | { readonly kind: "independence" | "minimise"; readonly theory: NamedTheory; readonly options: Options }
    | {
        readonly kind: "models";
        readonly theory: NamedTheory;
        /** How many points; at least 1. */
        readonly size: number;
        readonly options: Options;
      }
    | {
        readonly kind: "count";
        readonly theory: NamedTheory;
        /** Whether one model of each class of isomorphic ones is to be shown. */
        readonly representatives: boolean;
        /** `upTo` is never null here. */
        readonly options: Options;
      }
    | {
        readonly kind: "normalise";
        /** May have free variables. */
        readonly subject: NamedSentence;
        readonly form: NormalFormName;
        /** Whether each step is to be shown. */
        readonly steps: boolean;
      }
    | {
        readonly kind: "write";
        readonly subject: WrittenSubject;
        readonly format: WrittenFormat;
      }
  );

export type StatementKind = Statement["kind"];

/** What `write` prints. */
export type WrittenSubject =
  | {
      readonly kind: "theory";
      readonly theory: NamedTheory;
      /** The sentence asked about; null when the theory alone is written. */
      readonly conclusion: NamedSentence | null;
    }
  /** What is true in a structure, as SMT-LIB: a problem for each sentence. */
  | {
      readonly kind: "structure";
      readonly structure: NamedStructure;
      /** One, or the axioms of a theory. */
      readonly sentences: readonly WrittenSentence[];
      /** What was asked of the structure, as written. */
      readonly asked: string;
    };

/** A sentence, and what it is called where it is written. */
export interface WrittenSentence {
  readonly name: string;
  readonly formula: Formula;
}

/** How `write` prints a theory or a question for other programs. */
export type WrittenFormat =
  | { readonly kind: "smt-lib" }
  /** The clauses of the search on this many points. */
  | { readonly kind: "dimacs"; readonly size: number };

/** What `describe` can be asked about. */
export type DescribeSubject =
  | { readonly kind: "theory"; readonly theory: NamedTheory }
  | { readonly kind: "structure"; readonly structure: NamedStructure }
  | { readonly kind: "formula"; readonly definition: Definition & { kind: "formula" } }
  | { readonly kind: "sentence"; readonly sentence: NamedSentence }
  | { readonly kind: "relation"; readonly relation: RelationSymbol };

/** The names that cell text can use: declared relations, and definitions by name. Immutable. */
export interface Scope {
  /** As declared; while it is empty, the two-place relation `R` is there. */
  readonly declared: readonly RelationSymbol[];
  readonly definitions: ReadonlyMap<string, Definition>;
}

export const emptyScope: Scope = { declared: [], definitions: new Map() };

/** The relation that is there without a `relation` statement. */
export const defaultRelation: RelationSymbol = { name: "R", places: 2, infix: false };

/** The relations that text may use in a scope. */
export function relationsIn(scope: Scope): readonly RelationSymbol[] {
  return scope.declared.length === 0 ? [defaultRelation] : scope.declared;
}

/** The scope after a statement has run; only `relation` and `define` change it. */
export function scopeAfter(scope: Scope, statement: Statement): Scope {
  if (statement.kind === "relation") return declare(scope, statement.relations);
  if (statement.kind === "define") {
    const definitions = new Map(scope.definitions);
    definitions.set(statement.definition.name, statement.definition);
    return { ...declare(scope, statement.declares ?? []), definitions };
  }
  return scope;
}

/** The scope with more relations declared; of one name the latest. */
export function declare(scope: Scope, relations: readonly RelationSymbol[]): Scope {
  if (relations.length === 0) return scope;
  const names = new Set(relations.map((relation) => relation.name));
  const kept = scope.declared.filter((relation) => !names.has(relation.name));
  return { ...scope, declared: [...kept, ...relations] };
}

/** What reading a cell came to: either mistakes, and then nothing may run, or statements. */
export interface ParsedCell {
  /** In order; empty when there are diagnostics. */
  readonly statements: readonly Statement[];
  /** In order of place. */
  readonly diagnostics: readonly Diagnostic[];
}
