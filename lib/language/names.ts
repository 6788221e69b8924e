/** The names that text can use while a cell is being read. */
import type { RelationSymbol } from "../logic/formula.ts";
import { SIMPLE_CARRIERS } from "./carrier-help.ts";
import { laterStatements, statementHelp } from "./help.ts";
import { isSignWord } from "./lexer.ts";
import { nearestName } from "./nearest.ts";
import { type Definition, declare, relationsIn, type Scope, type Statement } from "./statements.ts";
import { keywords } from "./tokens.ts";

export type NameKind = "relation" | "formula" | "theory" | "structure";

/** What a name stands for. A damaged one was bound by a statement with a mistake and fits everywhere. */
export type Named =
  | { readonly kind: "relation"; readonly relation: RelationSymbol }
  | { readonly kind: "formula"; readonly definition: Definition & { kind: "formula" } }
  | { readonly kind: "theory"; readonly definition: Definition & { kind: "theory" } }
  | { readonly kind: "structure"; readonly definition: Definition & { kind: "structure" } }
  | { readonly kind: "damaged"; readonly as: NameKind | null };

const keptWords: ReadonlySet<string> = new Set([
  ...SIMPLE_CARRIERS,
  ...keywords.map((keyword) => keyword.word),
  ...statementHelp.map((help) => help.word),
  ...laterStatements,
]);

/** Whether a word belongs to the language and can name nothing. */
export function isKeptWord(word: string): boolean {
  return isSignWord(word) || keptWords.has(word);
}

/** Whether a word is a variable: a lower-case letter, then digits, then primes. */
export function isVariable(word: string): boolean {
  return /^[a-z][0-9]*'*$/.test(word);
}

/**
 * The scope at a place of a cell: what came before the cell, and what the statements read so far will add. It is
 * changed in place, so that a cell of many definitions is read in linear time.
 */
export class Names {
  #declared: Scope;
  readonly #definitions: Map<string, Definition>;
  readonly #damaged = new Map<string, NameKind | null>();
  #relations = new Map<string, RelationSymbol>();
  /** No known name is longer, in UTF-16 units. */
  longest = 0;

  constructor(scope: Scope) {
    this.#declared = { declared: scope.declared, definitions: new Map() };
    this.#definitions = new Map(scope.definitions);
    for (const name of this.#definitions.keys()) this.longest = Math.max(this.longest, name.length);
    this.#listRelations();
  }

  #listRelations(): void {
    this.#relations = new Map(relationsIn(this.#declared).map((relation) => [relation.name, relation]));
    for (const name of this.#relations.keys()) this.longest = Math.max(this.longest, name.length);
  }

  /** The scope as it stands, damaged names left out. */
  get scope(): Scope {
    return { declared: this.#declared.declared, definitions: new Map(this.#definitions) };
  }

  /** The relations in scope, in the order declared. */
  get relations(): readonly RelationSymbol[] {
    return [...this.#relations.values()];
  }

  /** Whether there has been a `relation` statement, so that the default `R` is gone. */
  get isDeclared(): boolean {
    return this.#declared.declared.length > 0;
  }

  /** The sole relation in scope, else null. */
  get sole(): RelationSymbol | null {
    return this.#relations.size === 1 ? [...this.#relations.values()][0]! : null;
  }

  /** Takes in what a statement adds. */
  add(statement: Statement): void {
    if (statement.kind === "relation") this.#declare(statement.relations);
    else if (statement.kind === "define") {
      if (statement.declares !== undefined) this.#declare(statement.declares);
      const { name } = statement.definition;
      this.#definitions.set(name, statement.definition);
      this.#damaged.delete(name);
      this.longest = Math.max(this.longest, name.length);
    }
  }

  #declare(relations: readonly RelationSymbol[]): void {
    this.#declared = declare(this.#declared, relations);
    for (const { name } of relations) this.#damaged.delete(name);
    this.#listRelations();
  }

  /** Binds a name by a statement that has a mistake: later uses of it are not mistakes on top of that. */
  damage(name: string, as: NameKind | null): void {
    this.#damaged.set(name, as);
    this.longest = Math.max(this.longest, name.length);
  }

  /** What a name stands for; null if nothing. */
  find(name: string): Named | null {
    const damaged = this.#damaged.get(name);
    if (damaged !== undefined) return { kind: "damaged", as: damaged };
    const relation = this.#relations.get(name);
    if (relation !== undefined) return { kind: "relation", relation };
    const definition = this.#definitions.get(name);
    switch (definition?.kind) {
      case "formula":
        return { kind: "formula", definition };
      case "theory":
        return { kind: "theory", definition };
      case "structure":
        return { kind: "structure", definition };
      default:
        return null;
    }
  }

  has(name: string): boolean {
    return name.length <= this.longest && this.find(name) !== null;
  }

  /** A relation that stands between its arguments, or may do so. */
  isInfix(name: string): boolean {
    const named = this.find(name);
    if (named?.kind === "relation") return named.relation.infix;
    return named?.kind === "damaged" && named.as === "relation";
  }

  /** All names of the kinds given, sorted, each with its kind. */
  list(kinds: readonly NameKind[]): readonly { readonly name: string; readonly kind: NameKind }[] {
    const found: { name: string; kind: NameKind }[] = [];
    for (const name of this.#relations.keys()) found.push({ name, kind: "relation" });
    for (const [name, { kind }] of this.#definitions) found.push({ name, kind });
    return found
      .filter(({ kind }) => kinds.includes(kind))
      .sort((a, b) => (a.name < b.name ? -1 : a.name > b.name ? 1 : 0));
  }

  /** The nearest known name of one of the kinds; null when none is near. */
  nearest(word: string, kinds: readonly NameKind[]): string | null {
    return nearestName(
      word,
      this.list(kinds).map(({ name }) => name),
    );
  }
}
