/**
 * What a formula says in clauses: the part of the checker that turns sentences into what a derivation starts from. The
 * searches use it too, so that both mean the same by a clause and a function; that is safe, since the checker works
 * it all out again.
 */
import {
  atomOf,
  type ClauseRecord,
  freeVariables,
  freshName,
  Growth,
  type LiteralRecord,
  partsOf,
  substituteInClause,
  type TermFormulaRecord,
  type TermRecord,
  type Terms,
  termVariables,
} from "./formulas.ts";
import { negationNormalForm } from "./made-formulas.ts";

/** Parts and literals beyond which there is no clause form; those written down on the way to it count. */
export const LARGEST_CLAUSE_FORM = 50_000;

/** A clause by keys of its literals: `+` or `-`, and the JSON text of the atom. */
type KeyedClause = Map<string, LiteralRecord>;

/**
 * The clauses of a closed formula, in which ∃y φ has become φ with a function in place of y, of the variables that y
 * depends on (Skolem 1920; Andrews 1981 for the arguments), and ∨ is distributed over ∧. No clause is true by two
 * opposite literals or by t = t, none has t ≠ t or a literal twice.
 *
 * A structure where the formula is true has, for each of its functions, one that makes the clauses true in it.
 * @param number of the formula; its functions are called `number.0`, `number.1`, … in the order of their quantifiers
 * @throws FormulaTooLarge
 */
export function clauseForm(
  formula: TermFormulaRecord,
  number: number,
  growth: Growth = new Growth(LARGEST_CLAUSE_FORM),
): readonly ClauseRecord[] {
  let functions = 0;
  const taken = new Set<string>();
  return clauses(negationNormalForm(formula, true, growth), new Map()).map((clause) => [...clause.values()]);

  function clauses(part: TermFormulaRecord, terms: Terms): readonly KeyedClause[] {
    switch (part[0]) {
      case "true":
        return [];
      case "false":
        return [new Map()];
      case "and":
        return partsOf(part).flatMap((inner) => clauses(inner, terms));
      case "or":
        return disjunction(partsOf(part).map((inner) => clauses(inner, terms)));
      case "forall":
      case "exists": {
        const [kind, variable, body] = part;
        return clauses(
          body,
          new Map(terms).set(variable, kind === "forall" ? universal(variable) : chosen(part, terms)),
        );
      }
      default: {
        const clause: KeyedClause = new Map();
        return addLiterals(clause, substituteInClause([part as LiteralRecord], terms, growth))
          ? [clause]
          : [];
      }
    }
  }

  /** All clauses made of one of each set. */
  function disjunction(sets: readonly (readonly KeyedClause[])[]): readonly KeyedClause[] {
    let result: KeyedClause[] = [new Map()];
    for (const set of sets) {
      const longer: KeyedClause[] = [];
      for (const first of result)
        for (const [place, second] of set.entries()) {
          // The last may have the clause itself, the others need copies.
          const joined = place === set.length - 1 ? first : new Map(first);
          growth.add(joined === first ? second.size : first.size + second.size);
          if (addKeyed(joined, second)) longer.push(joined);
        }
      result = longer;
    }
    return result;
  }

  /** A variable that stands in no other place. */
  function universal(variable: string): TermRecord {
    const name = freshName(variable, taken);
    taken.add(name);
    return name;
  }

  /** The value of an existential variable: a function of what its formula depends on. */
  function chosen(part: TermFormulaRecord, terms: Terms): TermRecord {
    const args = freeVariables(part).flatMap((variable) => termVariables(terms.get(variable)!));
    return [`${number}.${functions++}`, ...new Set(args)];
  }
}

/** A clause without repeated literals and without t ≠ t; null when it is true by opposite literals or t = t. */
export function simplifyClause(clause: ClauseRecord): ClauseRecord | null {
  const keyed: KeyedClause = new Map();
  return addLiterals(keyed, clause) ? [...keyed.values()] : null;
}

/** Adds literals to a clause; false when that makes it true by opposite literals or t = t. */
function addLiterals(clause: KeyedClause, literals: ClauseRecord): boolean {
  return literals.every((literal) => {
    const atom = atomOf(literal);
    const isSame = atom[0] === "=" && JSON.stringify(atom[1]) === JSON.stringify(atom[2]);
    if (isSame) return literal !== atom;
    return addKeyed(clause, new Map([[`${literal === atom ? "+" : "-"}${JSON.stringify(atom)}`, literal]]));
  });
}

function addKeyed(clause: KeyedClause, added: ReadonlyMap<string, LiteralRecord>): boolean {
  for (const [key, literal] of added) {
    if (clause.has(`${key.startsWith("+") ? "-" : "+"}${key.slice(1)}`)) return false;
    if (!clause.has(key)) clause.set(key, literal);
  }
  return true;
}
