/** The labels of axioms, as in `T.label` and `T - label`. */
import type { Axiom, Theory } from "../logic/theory.ts";
import type { Token } from "./lexer.ts";
import { nearestName } from "./nearest.ts";
import { quote, type Reader } from "./reader.ts";

/** Reads a label. */
export function readLabel(reader: Reader, after: string): Token {
  if (!reader.at("word")) reader.failExpected(`the label of an axiom after ${after}`);
  return reader.next();
}

/** Reports that a theory has no axiom of that label. */
export function reportLabel(reader: Reader, label: Token, name: string, known: readonly string[]): void {
  const near = nearestName(label.text, known);
  const shown = known.slice(0, 12).map(quote).join(", ") + (known.length > 12 ? ", …" : "");
  reader.report(
    "unknown-label",
    label,
    `${quote(name)} has no axiom ${quote(label.text)}`,
    near !== null ? `write \`${near}\`` : known.length === 0 ? "it has no axioms" : `its labels are ${shown}`,
  );
}

/**
 * Reads `.label` after the name of a theory, where a sentence is expected.
 * @returns null after a report
 */
export function readAxiomOf(
  reader: Reader,
  name: Token,
  { theory }: { readonly theory: Theory },
): Axiom | null {
  const labels = theory.axioms.map((axiom) => axiom.label);
  if (!reader.at("dot") || reader.peekAfter(1).kind !== "word") {
    const first = labels[0];
    reader.report(
      "wrong-kind",
      name,
      `${quote(name.text)} is a theory, where a formula is expected`,
      first === undefined ? null : `name one of its axioms: \`${name.text}.${first}\``,
    );
    return null;
  }
  reader.next();
  const label = readLabel(reader, "`.`");
  const axiom = theory.axioms.find((candidate) => candidate.label === label.text);
  if (axiom === undefined) reportLabel(reader, label, name.text, labels);
  else reader.charge(1, label);
  return axiom ?? null;
}
