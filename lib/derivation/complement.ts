/**
 * Clauses about complements. With every R(t, …) read as ¬R(t, …) a clause set has refutations just as before, read the same
 * way; but a strategy that selects negative literals goes another way through them. What it finds there is turned back.
 */
import type { ClauseRecord } from "../evidence/format.ts";
import type { ClauseTask, EngineOutcome } from "./refutation.ts";

/** The task with complements in place of all relations; identity stays as it is. */
export function complementTask(task: ClauseTask): ClauseTask {
  return { ...task, clauses: task.clauses.map((one) => ({ ...one, clause: complementClause(one.clause) })) };
}

/**
 * What an engine has found out about a task, from what it has about the complements.
 * @throws Error when the refutation defines relations: strategies that split cannot be used here
 */
export function complementOutcome(outcome: EngineOutcome): EngineOutcome {
  if (outcome.result !== "refuted") return outcome;
  const { definitions, steps } = outcome.refutation;
  if (definitions.length > 0) throw new Error("a strategy for complements must not split");
  return {
    result: "refuted",
    refutation: {
      definitions,
      steps: steps.map((step) =>
        "clause" in step ? { ...step, clause: complementClause(step.clause) } : step,
      ),
    },
  };
}

function complementClause(clause: ClauseRecord): ClauseRecord {
  return clause.map((literal) => {
    if (literal[0] === "not") return literal[1][0] === "=" ? literal : literal[1];
    return literal[0] === "=" ? literal : ["not", literal];
  });
}
