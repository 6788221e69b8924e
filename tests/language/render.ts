/** Statements and mistakes as lines of text, for the cases. */
import { printStructureDefinition } from "../../lib/language/carrier-printing.ts";
import type { Diagnostic } from "../../lib/language/diagnostics.ts";
import { printAxiomSet, printFormula } from "../../lib/language/printer.ts";
import type {
  Claim,
  Definition,
  DescribeSubject,
  NamedSentence,
  NamedStructure,
  NamedTheory,
  Options,
  ParsedCell,
  Statement,
} from "../../lib/language/statements.ts";
import type { RelationSymbol } from "../../lib/logic/formula.ts";
import type { CarrierDescription, StructureDefinition } from "../../lib/logic/structure-definition.ts";

/** One line for each statement, or for each mistake. */
export function renderCell({ statements, diagnostics }: ParsedCell): readonly string[] {
  if (diagnostics.length > 0) return diagnostics.map(renderDiagnostic);
  return statements.length === 0 ? ["(nothing)"] : statements.map(renderStatement);
}

function renderDiagnostic({ code, from, to, message, suggestion }: Diagnostic): string {
  return `${code} ${from}-${to} ${message} | ${suggestion ?? "(none)"}`;
}

function renderStatement(statement: Statement): string {
  switch (statement.kind) {
    case "relation":
      return `relation ${statement.relations.map(relation).join(", ")}`;
    case "define":
      return `define ${definition(statement.definition)}`;
    case "describe":
      return `describe ${subject(statement.subject)}`;
    case "derive":
      return `derive ${theory(statement.premises)} |= ${sentence(statement.conclusion)}${options(statement.options)}`;
    case "claim":
    case "conjecture":
      return `${statement.kind} ${claim(statement.claim)}${options(statement.options)}`;
    case "check-finite":
    case "dualise":
    case "independence":
    case "minimise":
      return `${statement.kind} ${theory(statement.theory)}${options(statement.options)}`;
    case "compare":
      return `compare ${statement.theories.map(theory).join(", ")}${options(statement.options)}`;
    case "models":
      return `models ${theory(statement.theory)} size ${statement.size}${options(statement.options)}`;
    case "count":
      return `count ${theory(statement.theory)}${statement.representatives ? " representatives" : ""}${options(statement.options)}`;
    case "normalise":
      return `normalise ${sentence(statement.subject)} to ${statement.form}${statement.steps ? " steps" : ""}`;
    case "write": {
      const { subject, format } = statement;
      const as = `as ${format.kind}${format.kind === "dimacs" ? ` of size ${format.size}` : ""}`;
      if (subject.kind === "structure") {
        const sentences = subject.sentences.map(
          ({ name, formula }) => `${name}: ${printFormula(formula, "ascii")}`,
        );
        return `write ${subject.structure.text} |= { ${sentences.join("; ")} } ${as}`;
      }
      const asked = subject.conclusion === null ? "" : ` |= ${sentence(subject.conclusion)}`;
      return `write ${theory(subject.theory)}${asked} ${as}`;
    }
  }
}

function relation({ name, places, infix }: RelationSymbol): string {
  return `${name}/${places}${infix ? " infix" : ""}`;
}

function definition(bound: Definition): string {
  switch (bound.kind) {
    case "formula": {
      const parameters = bound.parameters.length === 0 ? "" : `(${bound.parameters.join(", ")})`;
      return `formula ${bound.name}${parameters} := ${printFormula(bound.body, "ascii")}`;
    }
    case "theory": {
      const { fallback } = bound.theory;
      return `theory ${bound.name} := ${printAxiomSet(bound.theory, "ascii")} sole ${fallback?.name ?? "none"}`;
    }
    case "structure":
      return `structure ${bound.name} := ${structureText(bound.structure)}`;
  }
}

function structureText(structure: StructureDefinition): string {
  const bounds = boundsOf(structure.carrier);
  return `${printStructureDefinition(structure, "ascii")}${bounds === "" ? "" : ` with ${bounds}`}`;
}

/** The bounds that were chosen for a carrier, which are not printed. */
function boundsOf(description: CarrierDescription): string {
  const text = JSON.stringify(description, (key, value) =>
    typeof value === "object" || key === "offset" || key === "ends" ? value : undefined,
  );
  return [...text.matchAll(/"(offset|ends)":([0-9]+)/g)]
    .map(([, key, value]) => `${key} ${value}`)
    .join(", ");
}

/** The expression as written, then what it stands for. */
function theory(named: NamedTheory): string {
  return `[${named.text}] ${printAxiomSet(named.theory, "ascii")}`;
}

function sentence(named: NamedSentence): string {
  return `[${named.text}] ${printFormula(named.formula, "ascii")}`;
}

function structure(named: NamedStructure): string {
  return `[${named.text}] ${structureText(named.structure)}`;
}

function subject(about: DescribeSubject): string {
  switch (about.kind) {
    case "theory":
      return `theory ${theory(about.theory)}`;
    case "structure":
      return `structure ${structure(about.structure)}`;
    case "formula":
      return definition(about.definition);
    case "sentence":
      return `sentence ${sentence(about.sentence)}`;
    case "relation":
      return `relation ${relation(about.relation)}`;
  }
}

function claim(stated: Claim): string {
  switch (stated.kind) {
    case "entails":
    case "does-not-entail":
      return `${stated.kind} ${theory(stated.premises)} / ${sentence(stated.conclusion)}`;
    case "true-in":
    case "false-in":
      return `${stated.kind} ${structure(stated.structure)} / ${sentence(stated.sentence)}`;
    case "weaker":
    case "equivalent":
      return `${stated.kind} ${theory(stated.left)} / ${theory(stated.right)}`;
    default:
      return `${stated.kind} ${theory(stated.theory)}`;
  }
}

function options({ upTo, within }: Options): string {
  return `${upTo === null ? "" : ` up to ${upTo}`}${within === null ? "" : ` within ${within}`}`;
}
