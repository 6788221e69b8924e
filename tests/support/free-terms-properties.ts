/** What must be so of random structures of free terms, with as many runs as a level of tests has time for. */
import fc from "fast-check";
import { expect } from "vitest";
import { type CertificateRecord, readTerms, type TermsRecord } from "../../lib/carriers/free-terms.ts";
import { checkCertificate } from "../../lib/carriers/free-terms-check.ts";
import type { RelationSymbol } from "../../lib/logic/formula.ts";
import { Meter, WorkEnded } from "../../lib/logic/meter.ts";
import {
  type FormulaRecord,
  recordFormula,
  type TermFormulaRecord,
} from "../../lib/logic/records/formulas.ts";
import { certify } from "../../lib/structures/free-terms/find.ts";
import { GroundTerms, groundTerms, passes, takesWitnessesFromHypotheses } from "./ground-terms.ts";
import { sentences } from "./random-formulas.ts";
import { termsRecords } from "./random-terms.ts";

export const seed = Number(process.env.TWOPLACE_SEED ?? 20261201);
const R: RelationSymbol = { name: "R", places: 2, infix: false };
const P: RelationSymbol = { name: "P", places: 1, infix: false };
const options = (numRuns: number) => ({ seed, numRuns, verbose: 1 as const });
const meter = () => new Meter(1e6);

/** A formula without quantifiers about x and y. */
const matrices: fc.Arbitrary<TermFormulaRecord> = (() => {
  const variable = fc.constantFrom("x", "y");
  const leaf = fc.oneof(
    fc.tuple(variable, variable).map(([a, b]): TermFormulaRecord => ["is", "R", a, b]),
    variable.map((a): TermFormulaRecord => ["is", "P", a]),
    fc.constant<TermFormulaRecord>(["=", "x", "y"]),
  );
  const two = fc
    .tuple(fc.constantFrom("and", "or", "implies", "iff"), leaf, leaf)
    .map(([kind, a, b]) => [kind, a, b] as TermFormulaRecord);
  return fc.oneof(
    leaf,
    two,
    two.map((one): TermFormulaRecord => ["not", one]),
    fc.tuple(two, leaf).map(([a, b]): TermFormulaRecord => ["or", a, b]),
  );
})();

export function readsWhatIsWritten(runs: number): void {
  fc.assert(
    fc.property(termsRecords(true), (record) => {
      expect(readTerms(record)).toBe(record);
    }),
    options(runs),
  );
}

export function agreesAtGroundTerms(runs: number): void {
  let yes = 0;
  fc.assert(
    fc.property(termsRecords(true), matrices, fc.nat(7), fc.nat(7), (record, matrix, i, j) => {
      const terms = groundTerms(record, 8);
      const [x, y] = [terms[i]!, terms[j]!];
      const truth = new GroundTerms(record).isTrue(matrix, { every: [], some: [] }, { x, y });
      const sentence: FormulaRecord = ["exists", "x", ["exists", "y", matrix]];
      const certificate: CertificateRecord = [
        ["instances", x],
        ["instances", y],
      ];
      expect(checkCertificate(record, sentence, certificate, meter())).toBe(truth);
      if (truth) yes += 1;
    }),
    options(runs),
  );
  expect(yes).toBeGreaterThan(runs / 5);
  expect(yes).toBeLessThan((runs * 4) / 5);
}

export function agreesWithParameters(runs: number): void {
  let [yes, circles] = [0, 0];
  fc.assert(
    fc.property(termsRecords(true), matrices, fc.boolean(), (record, matrix, isClosed) => {
      const sentence: FormulaRecord = isClosed
        ? ["forall", "x", ["forall", "y", matrix]]
        : ["forall", "x", ["exists", "y", matrix]];
      const args = record.constructors.f!.map(() => "1");
      const certificate: CertificateRecord = isClosed ? [] : [["instances", ["f", ...args]]];
      if (!checkCertificate(record, sentence, certificate, meter())) return;
      yes += 1;
      expect(passes(record, sentence, certificate, 8)).toBe(true);
      if (JSON.stringify(matrix).includes('"R","x","x"')) circles += 1;
    }),
    options(runs),
  );
  expect(yes).toBeGreaterThan(runs / 30);
  expect(circles).toBeGreaterThan(runs / 300);
}

export function certifiesOneSide(runs: number): void {
  let [yes, inductions] = [0, 0];
  fc.assert(
    fc.property(termsRecords(true), sentences([R, P], 3), (record, formula) => {
      const sentence = recordFormula(formula);
      const found = [sentence, ["not", sentence] as FormulaRecord].filter((one) => {
        const certificate = certificateOf(record, one, 20);
        if (certificate === null) return false;
        if (JSON.stringify(certificate).includes("induction")) inductions += 1;
        if (!takesWitnessesFromHypotheses(certificate))
          expect(passes(record, one, certificate, 3), JSON.stringify([record, one, certificate])).toBe(true);
        return true;
      });
      expect(found.length, JSON.stringify([record, sentence])).toBeLessThan(2);
      yes += found.length;
    }),
    options(runs),
  );
  expect(yes).toBeGreaterThan(runs / 2);
  expect(inductions).toBeGreaterThan(runs / 200);
}

function certificateOf(
  record: TermsRecord,
  sentence: FormulaRecord,
  steps: number,
): CertificateRecord | null {
  try {
    return certify(record, [sentence], new Meter(steps))?.[0] ?? null;
  } catch (problem) {
    if (problem instanceof WorkEnded) return null;
    throw problem;
  }
}
