/** Negation normal form: of connectives only ∧ and ∨, and ¬ only before atoms. */
import { and, type Formula, not, or, partsOf } from "../formula.ts";
import { FormTooLarge, type Limits } from "./result.ts";
import { type Rule, rewriteDownwards, type StepRecorder } from "./steps.ts";

/**
 * Moves negations to the atoms by the laws of De Morgan and of quantifiers; φ → ψ becomes ¬φ ∨ ψ, and φ ↔ ψ a
 * conjunction of two disjunctions, whichever its sign, so that each side is doubled.
 * @throws FormTooLarge when more parts would come out than allowed
 */
export function toNegationForm(formula: Formula, limits: Limits, recorder: StepRecorder): Formula {
  if (negationSize(formula) > limits.parts) throw new FormTooLarge("parts", limits.parts);
  const result = rewriteDownwards(formula, negationRule, (whole) => whole, recorder);
  recorder.endPhase("implications removed, negations moved inwards", () => ({
    kind: "formula",
    formula: result,
  }));
  return result;
}

const negationRule: Rule = (formula) => {
  if (formula.kind === "implies")
    return { done: "implication removed", formula: or(not(formula.left), formula.right) };
  if (formula.kind === "iff")
    return {
      done: "equivalence removed",
      formula: and(or(not(formula.left), formula.right), or(not(formula.right), formula.left)),
    };
  if (formula.kind !== "not") return null;
  const { body } = formula;
  const moved = (result: Formula) => ({ done: "negation moved inwards", formula: result });
  switch (body.kind) {
    case "atom":
    case "equal":
      return null;
    case "true":
      return { done: "negated constant removed", formula: { kind: "false" } };
    case "false":
      return { done: "negated constant removed", formula: { kind: "true" } };
    case "not":
      return { done: "double negation removed", formula: body.body };
    case "and":
      return moved(or(...body.parts.map(not)));
    case "or":
      return moved(and(...body.parts.map(not)));
    case "implies":
      return moved(and(body.left, not(body.right)));
    case "iff":
      return moved(and(or(body.left, body.right), or(not(body.left), not(body.right))));
    case "forall":
      return moved({ kind: "exists", variable: body.variable, body: not(body.body) });
    case "exists":
      return moved({ kind: "forall", variable: body.variable, body: not(body.body) });
  }
};

/** At least the number of parts of the negation normal form; may be infinite. */
function negationSize(formula: Formula): number {
  const known = [new Map<Formula, number>(), new Map<Formula, number>()] as const;
  const size = (part: Formula, sign: 0 | 1): number => {
    const before = known[sign].get(part);
    if (before !== undefined) return before;
    const other = sign === 0 ? 1 : 0;
    let sum: number;
    switch (part.kind) {
      case "not":
        sum = 1 + size(part.body, other);
        break;
      case "implies":
        sum = 1 + size(part.left, other) + size(part.right, sign);
        break;
      case "iff":
        sum = 3 + size(part.left, 0) + size(part.left, 1) + size(part.right, 0) + size(part.right, 1);
        break;
      default:
        sum = partsOf(part).reduce((total, inner) => total + size(inner, sign), 1);
    }
    known[sign].set(part, sum);
    return sum;
  };
  return size(formula, 0);
}
