import { buildStructure } from "../../lib/carriers/defined.ts";
import type { Structure } from "../../lib/carriers/structure.ts";
import { EVIDENCE_FORMAT, EVIDENCE_VERSION, type Evidence } from "../../lib/evidence/format.ts";
import type { ClaimAnswer, DerivationReport, Search } from "../../lib/inquiry/answer.ts";
import type { Claim, NamedTheory, Statement, StatementKind } from "../../lib/language/statements.ts";
import {
  and,
  atom,
  equal,
  exists,
  type Formula,
  forall,
  implies,
  not,
  type RelationSymbol,
} from "../../lib/logic/formula.ts";
import type { Theory } from "../../lib/logic/theory.ts";

export const R: RelationSymbol = { name: "R", places: 2, infix: false };
export const between: RelationSymbol = { name: "Between", places: 3, infix: false };
export const deep: RelationSymbol = { name: "Deep", places: 1, infix: false };

export const irr = forall("x", not(atom(R, "x", "x")));
export const trans = forall(
  ["x", "y", "z"],
  implies(and(atom(R, "x", "y"), atom(R, "y", "z")), atom(R, "x", "z")),
);
export const unique = forall(
  ["x", "y", "z"],
  implies(and(atom(R, "x", "y"), atom(R, "x", "z")), equal("y", "z")),
);
export const serial = forall("x", exists("y", atom(R, "x", "y")));

export function theoryOf(sentences: Readonly<Record<string, Formula>>): Theory {
  const axioms = Object.entries(sentences).map(([label, formula]) => ({ label, formula, named: true }));
  return { axioms, fallback: R };
}

export const order: NamedTheory = { text: "Order", theory: theoryOf({ irr, trans }) };
export const chains: NamedTheory = { text: "Chains - last", theory: theoryOf({ trans, unique }) };

export function structureOf(size: number, ...tables: [RelationSymbol, number[][]][]): Structure {
  return buildStructure({
    carrier: { kind: "points", size },
    relations: tables.map(([relation, tuples]) => ({ relation, tuples })),
  });
}

export const loop = structureOf(1, [R, [[1, 1]]]);
export const chain = structureOf(3, [R, [[1, 2], [2, 3], [1, 3]]]); // biome-ignore format: a table
export const mixed = structureOf(4, [R, [[1, 2], [2, 3], [3, 1]]], [between, [[1, 2, 3], [3, 2, 1]]], [deep, [[2], [4]]]); // biome-ignore format: a table

/** Evidence of no content: displays ask only whether there is any. */
export const evidence = { format: EVIDENCE_FORMAT, version: EVIDENCE_VERSION } as Evidence;

export function stated(kind: StatementKind, rest: object, options: object = {}): Statement {
  const text = `${kind} …`;
  return {
    kind,
    text,
    from: 0,
    to: text.length,
    options: { upTo: null, within: null, ...options },
    ...rest,
  } as unknown as Statement;
}

export const conclusion = { text: "serial", formula: serial };
export const entails: Claim = { kind: "entails", premises: order, conclusion };

export function searched(rest: Partial<Search> = {}): Search {
  return {
    sought: "a countermodel",
    noneUpTo: 8,
    foundAt: null,
    ended: null,
    endedAt: null,
    symmetricUpTo: null,
    noneOnCarriers: 0,
    configurations: null,
    ...rest,
  };
}

export function reported(rest: Partial<DerivationReport> = {}): DerivationReport {
  return { sought: "the conclusion", result: "stopped", ended: null, generated: 0, ...rest };
}

export function claimAnswer(rest: Partial<ClaimAnswer>): ClaimAnswer {
  return {
    question: "claim",
    verdict: "open",
    steps: 12345,
    evidence: null,
    structures: [],
    searches: [],
    derivations: [],
    reports: [],
    inconsistent: false,
    noFinite: null,
    axioms: null,
    ...rest,
  };
}

export function found(role: string, structure: Structure, rest: Partial<ClaimAnswer> = {}): ClaimAnswer {
  return claimAnswer({ verdict: "fails", evidence, structures: [{ role, structure }], ...rest });
}
