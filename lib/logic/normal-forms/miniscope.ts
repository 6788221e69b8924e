/** Miniscoped form: every quantifier stands before as little as can be reached by moving it inwards. */
import { join, quantifyAll } from "../clausal-formulas.ts";
import { type Formula, freeVariables, type Variable } from "../formula.ts";
import { FormTooLarge, type Limits } from "./result.ts";
import { type Plug, rewriteParts, type StepRecorder } from "./steps.ts";

type QuantifierKind = "forall" | "exists";

/**
 * Moves the quantifiers of a formula in negation normal form inwards (Wang 1960): ∀ is distributed over ∧ and ∃ over
 * ∨; over the other junction a quantifier goes to the parts in which its variable occurs; one that binds nothing is
 * dropped. Of neighbouring quantifiers of one kind, that one is moved first whose new scope has the fewest free
 * variables, the greedy rule for elimination orders (Bertelè & Brioschi 1972).
 * @throws FormTooLarge when distributing would make more parts than allowed
 */
export function toMiniscopedForm(formula: Formula, limits: Limits, recorder: StepRecorder): Formula {
  const result = new Miniscoping(limits, recorder).rewrite(formula, (whole) => whole);
  recorder.endPhase("quantifiers moved inwards", () => ({ kind: "formula", formula: result }));
  return result;
}

class Miniscoping {
  readonly #limits: Limits;
  readonly #recorder: StepRecorder;
  /** Quantifiers that distributing has made. */
  #made = 0;

  constructor(limits: Limits, recorder: StepRecorder) {
    this.#limits = limits;
    this.#recorder = recorder;
  }

  rewrite(formula: Formula, plug: Plug): Formula {
    if (formula.kind !== "forall" && formula.kind !== "exists")
      return rewriteParts(formula, plug, (part, inner) => this.rewrite(part, inner));
    const { kind } = formula;
    const block: Variable[] = [];
    let body: Formula = formula;
    while (body.kind === kind) {
      block.push(body.variable);
      body = body.body;
    }
    const inner = this.rewrite(body, (part) => plug(quantifyAll(kind, block, part)));
    return this.#push(kind, block, inner, plug);
  }

  /** Moves a block of quantifiers into a body in which none can be moved further. */
  #push(kind: QuantifierKind, block: readonly Variable[], body: Formula, plug: Plug): Formula {
    const free = freeVariables(body);
    // A variable that stands in the block twice is bound by its last quantifier.
    const used = block.filter(
      (variable, index) => free.includes(variable) && block.lastIndexOf(variable) === index,
    );
    if (used.length < block.length)
      this.#note("vacuous quantifier dropped", plug, quantifyAll(kind, used, body));
    if (used.length === 0) return body;
    if (body.kind === kind) {
      const whole = [...used, body.variable];
      let inner = body.body;
      while (inner.kind === kind) {
        whole.push(inner.variable);
        inner = inner.body;
      }
      return this.#push(kind, whole, inner, plug);
    }
    if (body.kind === (kind === "forall" ? "and" : "or")) return this.#distribute(kind, used, body, plug);
    if (body.kind === (kind === "forall" ? "or" : "and")) return this.#split(kind, used, body, plug);
    return quantifyAll(kind, used, body);
  }

  /** ∀ over ∧, ∃ over ∨. */
  #distribute(
    kind: QuantifierKind,
    block: readonly Variable[],
    body: Formula & { kind: "and" | "or" },
    plug: Plug,
  ): Formula {
    const blocks = body.parts.map((part) =>
      block.filter((variable) => freeVariables(part).includes(variable)),
    );
    this.#made += blocks.reduce((sum, own) => sum + own.length, 0) - block.length;
    if (this.#made > this.#limits.parts) throw new FormTooLarge("parts", this.#limits.parts);
    const parts = body.parts.map((part, index) => quantifyAll(kind, blocks[index]!, part));
    this.#note("quantifier distributed", plug, join(body.kind, parts));
    for (const [index, part] of body.parts.entries())
      parts[index] = this.#push(kind, blocks[index]!, part, (inner) =>
        plug(join(body.kind, parts.with(index, inner))),
      );
    return join(body.kind, parts);
  }

  /** ∀ over ∨, ∃ over ∧: each variable in turn goes to the parts in which it occurs. */
  #split(
    kind: QuantifierKind,
    block: readonly Variable[],
    body: Formula & { kind: "and" | "or" },
    plug: Plug,
  ): Formula {
    let parts: readonly Formula[] = body.parts;
    let waiting: readonly Variable[] = block;
    while (waiting.length > 0) {
      const choice = cheapest(waiting, parts);
      if (choice === null) break;
      const group = parts.filter((part) => freeVariables(part).includes(choice));
      waiting = waiting.filter((variable) => variable !== choice);
      const [before, after] = around(parts, new Set(group));
      const whole: Plug = (part) =>
        plug(quantifyAll(kind, waiting, join(body.kind, [...before, part, ...after])));
      const scope = join(body.kind, group);
      this.#note("quantifier moved inwards", whole, quantifyAll(kind, [choice], scope));
      const moved =
        group.length === 1 ? this.#push(kind, [choice], scope, whole) : quantifyAll(kind, [choice], scope);
      parts = [...before, moved, ...after];
    }
    return quantifyAll(kind, waiting, join(body.kind, parts));
  }

  #note(done: string, plug: Plug, part: Formula): void {
    this.#recorder.noteFormula(done, () => plug(part));
  }
}

/** The parts outside a group: those before its first member, and the others. */
function around(
  parts: readonly Formula[],
  group: ReadonlySet<Formula>,
): [readonly Formula[], readonly Formula[]] {
  const first = parts.findIndex((part) => group.has(part));
  return [parts.slice(0, first), parts.slice(first).filter((part) => !group.has(part))];
}

/**
 * The variable to move inwards next: of those that do not occur in all parts, the one whose parts have the fewest
 * free variables together, the last of several; null when all occur everywhere.
 */
function cheapest(variables: readonly Variable[], parts: readonly Formula[]): Variable | null {
  const groups = new Map(variables.map((variable) => [variable, { parts: 0, scope: new Set<Variable>() }]));
  for (const part of parts) {
    const free = freeVariables(part);
    for (const variable of free) {
      const group = groups.get(variable);
      if (group === undefined) continue;
      group.parts += 1;
      for (const other of free) group.scope.add(other);
    }
  }
  let best: Variable | null = null;
  let least = Number.POSITIVE_INFINITY;
  for (const [variable, { parts: count, scope }] of groups) {
    if (count === parts.length || scope.size > least) continue;
    best = variable;
    least = scope.size;
  }
  return best;
}
