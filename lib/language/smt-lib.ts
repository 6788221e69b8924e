/**
 * Theories and questions as scripts of SMT-LIB 2.6, in the logic UF: one sort, the relations as functions to Bool,
 * every axiom an assertion with its label as name.
 *
 * A question `T ⊨ φ` is put as a refutation problem: the axioms and the negation of φ. `unsat` says that T entails φ;
 * `sat` gives a countermodel.
 */
import type { Formula, RelationSymbol, Variable } from "../logic/formula.ts";
import { sentencesOf, signatureOf, type Theory } from "../logic/theory.ts";
import { axiomSymbol, relationSymbol, writeSymbol } from "./smt-lib-symbols.ts";

/** The sort of the elements. */
const SORT = "U";
/** The name of the assertion that negates the conclusion. Its bars keep it apart from labels. */
const GOAL = "|negated conclusion|";

/**
 * Writes a script, each line ended.
 * @param conclusion the sentence asked about; null when the theory alone is written
 */
export function printSmtLib(theory: Theory, conclusion: Formula | null): string {
  const sentences = [...sentencesOf(theory), ...(conclusion === null ? [] : [conclusion])];
  const { relations } = signatureOf(sentences, theory.fallback);
  const names = new Set(relations.map(({ name }) => name));
  const meaning =
    conclusion === null
      ? "; sat: the theory has a model, unsat: it has none"
      : "; unsat: the theory entails the conclusion, sat: it does not";
  return [
    meaning,
    "(set-info :smt-lib-version 2.6)",
    "(set-logic UF)",
    `(declare-sort ${SORT} 0)`,
    ...relations.map(
      ({ name, places }) =>
        `(declare-fun ${relationSymbol(name)} (${Array(places).fill(SORT).join(" ")}) Bool)`,
    ),
    ...theory.axioms.map(({ label, formula }) => assertion(formula, axiomSymbol(label, names))),
    ...(conclusion === null ? [] : [assertion({ kind: "not", body: conclusion }, GOAL)]),
    "(check-sat)",
    "",
  ].join("\n");
}

function assertion(formula: Formula, name: string): string {
  return `(assert (! ${printTerm(formula)} :named ${name}))`;
}

function printTerm(formula: Formula): string {
  switch (formula.kind) {
    case "true":
    case "false":
      return formula.kind;
    case "atom":
      return printAtom(formula.relation, formula.args);
    case "equal":
      return `(= ${writeSymbol(formula.left)} ${writeSymbol(formula.right)})`;
    case "not":
      return `(not ${printTerm(formula.body)})`;
    case "and":
    case "or":
      return `(${formula.kind} ${formula.parts.map(printTerm).join(" ")})`;
    case "implies":
      return `(=> ${printTerm(formula.left)} ${printTerm(formula.right)})`;
    case "iff":
      return `(= ${printTerm(formula.left)} ${printTerm(formula.right)})`;
    case "forall":
    case "exists": {
      const { kind } = formula;
      // A variable may stand only once in a list.
      const list: Variable[] = [formula.variable];
      let body = formula.body;
      while (body.kind === kind && !list.includes(body.variable)) {
        list.push(body.variable);
        body = body.body;
      }
      const variables = list.map((variable) => `(${writeSymbol(variable)} ${SORT})`).join(" ");
      return `(${kind} (${variables}) ${printTerm(body)})`;
    }
  }
}

function printAtom(relation: RelationSymbol, args: readonly Variable[]): string {
  return `(${[relationSymbol(relation.name), ...args.map(writeSymbol)].join(" ")})`;
}
