/**
 * Formulas made of formulas, as records: negation normal form, miniscoping, and the unfolding of definitions. The searches
 * use them to make what they start from, the checker of evidence to make it again.
 */
import {
  freeVariables,
  Growth,
  partsOf,
  substitute,
  type TermFormulaRecord,
  type TermRecord,
  withParts,
} from "./formulas.ts";

/**
 * Negation normal form: ¬ at atoms only, of the other connectives only ∧ and ∨.
 * @param positive false for that of the negation
 * @throws FormulaTooLarge
 */
export function negationNormalForm(
  formula: TermFormulaRecord,
  positive: boolean,
  growth: Growth,
): TermFormulaRecord {
  growth.add();
  const part = (inner: TermFormulaRecord, sign: boolean) => negationNormalForm(inner, sign, growth);
  const either = (yes: "and" | "true" | "forall", kind: string) => (kind === yes) === positive;
  switch (formula[0]) {
    case "is":
    case "=":
      return positive ? formula : ["not", formula];
    case "true":
    case "false":
      return [either("true", formula[0]) ? "true" : "false"];
    case "not":
      return part(formula[1], !positive);
    case "and":
    case "or":
      return [
        either("and", formula[0]) ? "and" : "or",
        ...partsOf(formula).map((one) => part(one, positive)),
      ];
    case "implies":
      return [positive ? "or" : "and", part(formula[1], !positive), part(formula[2], positive)];
    case "iff": {
      // ¬(φ ↔ ψ) is ¬φ ↔ ψ.
      const [, left, right] = formula;
      return [
        "and",
        ["or", part(left, !positive), part(right, true)],
        ["or", part(left, positive), part(right, false)],
      ];
    }
    case "forall":
    case "exists":
      return [either("forall", formula[0]) ? "forall" : "exists", formula[1], part(formula[2], positive)];
  }
}

/** What ∀x … (d(x, …) ↔ φ) says of d. */
interface Meaning {
  readonly name: string;
  readonly parameters: readonly string[];
  readonly body: TermFormulaRecord;
}

/** The definition that a closed formula is, or null when it is none: each quantified variable is an argument, once. */
function meaningOf(formula: TermFormulaRecord): Meaning | null {
  const variables = new Set<string>();
  let inner = formula;
  for (; inner[0] === "forall"; inner = inner[2]) variables.add(inner[1]);
  if (inner[0] !== "iff" || inner[1][0] !== "is") return null;
  const [, [, name, ...args], body] = inner;
  const parameters = args.filter((arg): arg is string => typeof arg === "string" && variables.has(arg));
  const distinct = new Set(parameters);
  if (distinct.size !== args.length || distinct.size !== variables.size) return null;
  return { name, parameters, body };
}

/**
 * The formula with the body of a definition in place of the relation that it defines. With the definition, both say
 * the same: every d(t, …) gives way to the φ(t, …) that it is equivalent to, without capture of variables in t, ….
 * A d with another number of places is another relation, and stays.
 * @param definition closed; ∀x … (d(x, …) ↔ φ) with the quantifiers in any order
 * @returns null when it is not of that form
 * @throws FormulaTooLarge
 */
export function unfoldFormula(
  formula: TermFormulaRecord,
  definition: TermFormulaRecord,
  growth: Growth = new Growth(),
): TermFormulaRecord | null {
  const meaning = meaningOf(definition);
  if (meaning === null) return null;
  const { name, parameters, body } = meaning;
  return unfold(formula);

  function unfold(part: TermFormulaRecord): TermFormulaRecord {
    growth.add();
    if (part[0] === "is" && part[1] === name && part.length === parameters.length + 2) {
      const args = part.slice(2) as TermRecord[];
      return substitute(
        body,
        new Map(parameters.map((parameter, place) => [parameter, args[place]!])),
        growth,
      );
    }
    return withParts(part, partsOf(part).map(unfold));
  }
}

/**
 * The formula in negation normal form, its quantifiers as far inside as they go: those that bind nothing dropped, since
 * domains are not empty, ∀ moved over ∧ and ∃ over ∨, and past the parts of a ∨ or ∧ that do not have their variable.
 * Of quantifiers of one kind, each moves past the others where that takes it further.
 * @throws FormulaTooLarge
 */
export function miniscopeFormula(
  formula: TermFormulaRecord,
  growth: Growth = new Growth(),
): TermFormulaRecord {
  return moveInside(negationNormalForm(formula, true, growth));

  function moveInside(part: TermFormulaRecord): TermFormulaRecord {
    growth.add();
    const parts = partsOf(part).map(moveInside);
    if (part[0] === "and" || part[0] === "or") return junction(part[0], parts);
    return part[0] === "forall" || part[0] === "exists" ? push(part[0], part[1], parts[0]!) : part;
  }

  /** The quantifier before a body that is miniscoped already. */
  function push(kind: "forall" | "exists", variable: string, body: TermFormulaRecord): TermFormulaRecord {
    growth.add();
    const has = (part: TermFormulaRecord) => freeVariables(part).includes(variable);
    if (!has(body)) return body;
    const parts = partsOf(body);
    if (body[0] === (kind === "forall" ? "and" : "or"))
      return junction(
        body[0],
        parts.map((part) => push(kind, variable, part)),
      );
    if (body[0] === "and" || body[0] === "or") {
      const inside = parts.filter(has);
      if (inside.length === parts.length) return [kind, variable, body];
      return junction(body[0], [
        ...parts.filter((part) => !has(part)),
        push(kind, variable, junction(body[0], inside)),
      ]);
    }
    if (body[0] === kind) {
      // ∀x ∀y φ is ∀y ∀x φ; x moves past y if it gets further inside than just behind it.
      const moved = push(kind, variable, body[2]);
      if (moved[0] !== kind || moved[1] !== variable) return push(kind, body[1], moved);
    }
    return [kind, variable, body];
  }
}

/** The conjunction or disjunction, flat, without ⊤ and ⊥. */
export function junction(kind: "and" | "or", parts: readonly TermFormulaRecord[]): TermFormulaRecord {
  const [neutral, absorbing] = kind === "and" ? (["true", "false"] as const) : (["false", "true"] as const);
  const flat = parts.flatMap((part) =>
    part[0] === kind ? partsOf(part) : part[0] === neutral ? [] : [part],
  );
  if (flat.some((part) => part[0] === absorbing)) return [absorbing];
  return flat.length > 1 ? [kind, ...flat] : (flat[0] ?? [neutral]);
}
