/** The `data` of `eval --json`: what a program wants to know of an answer. The README lists the keys. */

import { sizeOf } from "../../lib/carriers/any-structure.ts";
import type { Answer, ClaimAnswer, FiniteAnswer, ShownDerivation } from "../../lib/inquiry/answer.ts";
import type { Findings } from "../../lib/inquiry/examine.ts";
import { printFormula } from "../../lib/language/printer.ts";
import type { Definition, DescribeSubject, Statement } from "../../lib/language/statements.ts";
import {
  depthOf,
  type Formula,
  freeVariables,
  type RelationSymbol,
  relationsOf,
  usesIdentity,
} from "../../lib/logic/formula.ts";
import { describeSyntax } from "../../lib/logic/fragments.ts";
import { sentencesOf, type Theory, theoryDepth, theorySignature } from "../../lib/logic/theory.ts";
import { countData } from "./counts.ts";
import { findingsData } from "./findings.ts";
import { onPoints, pointsData } from "./finite-structures.ts";
import { reasonData } from "./reasons.ts";
import { infiniteData, structureData } from "./structures.ts";
import { claimOf } from "./summaries.ts";
import { prefixOf, syntaxData } from "./theories.ts";

type Data = Readonly<Record<string, unknown>>;

/**
 * Plain data that `JSON.stringify` keeps as it is; formulas are text in the ASCII spelling.
 * @param answer null for the statements that ask nothing
 * @param findings what `describe` has found out about a theory; null for everything else
 */
export function dataOf(statement: Statement, answer: Answer | null, findings: Findings | null = null): Data {
  switch (answer?.question) {
    case undefined:
      return stated(statement, findings);
    case "claim":
      return claimData(statement, answer);
    case "check-finite":
      return {
        leastSize: answer.leastSize,
        modelSize: answer.modelSize,
        noModelUpTo: answer.noModelUpTo,
        provenUpTo: answer.provenUpTo,
        ...infiniteData(answer.model),
        ...reasonOf(answer),
        ...usedIn(answer.derivation === null ? [] : [answer.derivation]),
      };
    case "models":
      return {
        size: answer.size,
        models: answer.models.map((model) => pointsData(onPoints(model)!)),
        complete: answer.complete,
      };
    case "count":
      return countData(answer);
    case "independence":
      return { axioms: Object.fromEntries(answer.axioms.map(({ label, verdict }) => [label, verdict])) };
    case "compare":
      return {
        pairs: answer.pairs.map(({ left, right, verdict, jointlyInconsistent }) => ({
          left: answer.names[left],
          right: answer.names[right],
          verdict,
          jointlyInconsistent,
        })),
        classes: answer.classes,
        inconsistent: answer.inconsistent.map(({ name }) => name),
      };
    case "minimise":
      return {
        sets: answer.sets.map(({ labels }) => labels),
        complete: answer.complete,
        open: answer.open,
      };
    case "dualise":
      return {
        pairs: answer.pairs.map(({ left, right, verdict }) => ({
          left: answer.duals[left]!.name,
          right: answer.duals[right]!.name,
          verdict,
        })),
      };
  }
}

function claimData(statement: Statement, answer: ClaimAnswer): Data {
  const claim = claimOf(statement);
  const found = answer.structures[0]?.structure ?? null;
  const size = found === null ? null : sizeOf(found);
  // Where several searches were made, only what all of them finished is free of what was sought.
  const noneUpTo =
    answer.searches.length === 0 ? 0 : Math.min(...answer.searches.map((search) => search.noneUpTo));
  const kind = { claim: claim?.kind ?? null };
  const derived = {
    ...infiniteData(found),
    ...reasonOf(answer),
    ...usedIn(answer.derivations),
    ...(answer.inconsistent ? { inconsistent: true } : {}),
  };
  switch (claim?.kind) {
    case "entails":
    case "does-not-entail":
      return { ...kind, countermodelSize: size, noCountermodelUpTo: noneUpTo, ...derived };
    case "consistent":
    case "infinite-only":
    case "no-finite-model":
      return { ...kind, modelSize: size, noModelUpTo: noneUpTo, ...derived };
    case "weaker":
    case "equivalent":
      return { ...kind, separatingSize: size, noneUpTo, ...derived };
    case "independent":
      return {
        ...kind,
        axioms: Object.fromEntries((answer.axioms ?? []).map(({ label, verdict }) => [label, verdict])),
      };
    default:
      return kind;
  }
}

/** Why there is no finite model; nothing where that was not derived. */
function reasonOf({ noFinite }: ClaimAnswer | FiniteAnswer): Data {
  return noFinite === null ? {} : { reason: reasonData(noFinite.reason) };
}

/** The axioms that derivations use, by label; nothing where nothing was derived. */
function usedIn(derivations: readonly ShownDerivation[]): Data {
  if (derivations.length === 0) return {};
  return { used: [...new Set(derivations.flatMap(({ premises }) => premises.map(({ label }) => label)))] };
}

function stated(statement: Statement, findings: Findings | null): Data {
  switch (statement.kind) {
    case "relation":
      return { relations: statement.relations.map(relationData) };
    case "define":
      return definitionData(statement.definition);
    case "describe":
      return {
        ...subjectData(statement.subject),
        ...(findings === null ? {} : { properties: findingsData(findings) }),
      };
    default:
      return {};
  }
}

function relationData({ name, places, infix }: RelationSymbol): Data {
  return { name, places, infix };
}

function definitionData(definition: Definition): Data {
  const { kind, name } = definition;
  switch (definition.kind) {
    case "formula":
      return { kind, name, parameters: definition.parameters, formula: ascii(definition.body) };
    case "theory":
      return { kind, name, axioms: axiomsData(definition.theory) };
    case "structure":
      return { kind, name, ...structureData(definition.structure) };
  }
}

function subjectData(subject: DescribeSubject): Data {
  switch (subject.kind) {
    case "theory": {
      const { theory } = subject.theory;
      const { relations, identity } = theorySignature(theory);
      return {
        kind: "theory",
        axioms: theory.axioms.map(({ label, formula }) => ({
          label,
          formula: ascii(formula),
          prefix: prefixOf(formula),
        })),
        relations: relations.map(relationData),
        identity,
        depth: theoryDepth(theory),
        ...(theory.axioms.length === 0 ? {} : syntaxData(describeSyntax(sentencesOf(theory)))),
      };
    }
    case "structure":
      return { kind: "structure", ...structureData(subject.structure.structure) };
    case "formula":
      return {
        kind: "formula",
        parameters: subject.definition.parameters,
        ...formulaData(subject.definition.body),
      };
    case "sentence":
      return { kind: "sentence", ...formulaData(subject.sentence.formula) };
    case "relation":
      return { kind: "relation", ...relationData(subject.relation) };
  }
}

function formulaData(formula: Formula): Data {
  return {
    formula: ascii(formula),
    relations: relationsOf(formula).map(relationData),
    identity: usesIdentity(formula),
    depth: depthOf(formula),
    prefix: prefixOf(formula),
    ...(freeVariables(formula).length > 0 ? {} : syntaxData(describeSyntax([formula]))),
  };
}

function axiomsData(theory: Theory): readonly Data[] {
  return theory.axioms.map(({ label, formula }) => ({ label, formula: ascii(formula) }));
}

function ascii(formula: Formula): string {
  return printFormula(formula, "ascii");
}
