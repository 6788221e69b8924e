/**
 * Expressions for sentences of prose, as Jupyter's `user_expressions` asks for them: `{verdict of claim 3}`,
 * `{count of Order on 4 points}`, `{formula of Order.trans}`.
 *
 *     expression = ( "verdict" | "reason" ) "of" "claim" WHOLE
 *                | "claim" WHOLE
 *                | [ "labelled" ] "count" "of" theory "on" WHOLE ( "point" | "points" )
 *                | "formula" "of" formula
 *                | "axioms" "of" theory
 *                | NAME
 */
import { LARGEST_DOMAIN } from "../logic/structure-definition.ts";
import type { Diagnostic } from "./diagnostics.ts";
import { readOpen } from "./formulas.ts";
import { Names } from "./names.ts";
import { nearestName } from "./nearest.ts";
import { readWhole } from "./numbers.ts";
import { CellEnds, quote, Reader, Unreadable } from "./reader.ts";
import type { Definition, NamedSentence, NamedTheory, Scope } from "./statements.ts";
import { readTheory } from "./theories.ts";

export type ProseExpression =
  /**
   * The verdict of the claim or conjecture with that number in the ledger, from 1; the reason why there is no finite model
   * that it rests on.
   */
  | { readonly kind: "verdict" | "reason"; readonly claim: number }
  /** Its text. */
  | { readonly kind: "claim"; readonly claim: number }
  /** How many models a theory has on so many points: up to isomorphism, or labelled. */
  | {
      readonly kind: "count";
      readonly theory: NamedTheory;
      readonly size: number;
      readonly labelled: boolean;
    }
  /** A formula, which may have free variables. */
  | { readonly kind: "formula"; readonly formula: NamedSentence }
  | { readonly kind: "axioms"; readonly theory: NamedTheory }
  | { readonly kind: "definition"; readonly definition: Definition };

export type ParsedExpression =
  | { readonly expression: ProseExpression }
  | { readonly diagnostics: readonly Diagnostic[] };

const FORMS = [
  "verdict of claim 3",
  "reason of claim 3",
  "claim 3",
  "count of T on 4 points",
  "labelled count of T on 4 points",
  "formula of T.a",
  "axioms of T",
];
const HINT = `expressions are ${FORMS.map((form) => `\`${form}\``).join(", ")} and names of definitions`;

/** Reads an expression for prose; whether a claim of that number exists is not known here. */
export function readExpression(text: string, scope: Scope): ParsedExpression {
  const reader = new Reader(text, new Names(scope));
  reader.beginStatement();
  reader.linesMatter = false;
  let expression: ProseExpression | null = null;
  try {
    expression = readBody(reader);
    if (!reader.at("end")) reader.failExpected("the end of the expression", HINT);
  } catch (error) {
    if (!(error instanceof Unreadable) && !(error instanceof CellEnds)) throw error;
  }
  if (expression === null || reader.diagnostics.length > 0) return { diagnostics: reader.diagnostics };
  return { expression };
}

function readBody(reader: Reader): ProseExpression | null {
  const word = reader.peek();
  const next = reader.peekAfter(1);
  const isForm = (form: string, second: string) =>
    reader.atWord(form) && next.kind === "word" && next.text === second;
  for (const kind of ["verdict", "reason"] as const) {
    if (!isForm(kind, "of")) continue;
    reader.next();
    reader.next();
    reader.expectWord("claim", `write \`${kind} of claim 3\``);
    return readClaimNumber(reader, kind);
  }
  if (reader.atWord("claim")) {
    reader.next();
    return readClaimNumber(reader, "claim");
  }
  if (isForm("labelled", "count") || isForm("count", "of")) return readCount(reader);
  if (isForm("formula", "of")) {
    reader.next();
    reader.next();
    const formula = readOpen(reader);
    return formula === null ? null : { kind: "formula", formula };
  }
  if (isForm("axioms", "of")) {
    reader.next();
    reader.next();
    const theory = readTheory(reader);
    return theory === null ? null : { kind: "axioms", theory };
  }
  if (word.kind !== "word") return reader.failExpected("an expression", HINT);
  return readName(reader);
}

function readClaimNumber(reader: Reader, kind: "verdict" | "reason" | "claim"): ProseExpression | null {
  const claim = readWhole(reader, "the number of a claim");
  return claim === null ? null : { kind, claim };
}

function readCount(reader: Reader): ProseExpression | null {
  const labelled = reader.acceptWord("labelled") !== null;
  reader.next();
  reader.expectWord("of", "write `count of T on 4 points`");
  const theory = readTheory(reader);
  reader.expectWord("on", "write `count of T on 4 points`");
  const size = readWhole(reader, "how many points the models have", LARGEST_DOMAIN);
  if (reader.acceptWord("point") === null) reader.expectWord("points", "write `on 4 points`");
  return theory === null || size === null ? null : { kind: "count", theory, size, labelled };
}

function readName(reader: Reader): ProseExpression | null {
  const word = reader.next();
  const named = reader.names.find(word.text);
  if (named !== null && named.kind !== "relation" && named.kind !== "damaged")
    return { kind: "definition", definition: named.definition };
  const near =
    reader.names.nearest(word.text, ["formula", "theory", "structure"]) ??
    nearestName(word.text, ["verdict", "reason", "claim", "count", "labelled", "formula", "axioms"]);
  return reader.fail(
    named === null ? "unknown-name" : "wrong-kind",
    word,
    named === null
      ? `${quote(word.text)} is not defined, and begins no expression`
      : `${quote(word.text)} is a relation, and no definition`,
    near === null ? HINT : `write \`${near}\``,
  );
}
