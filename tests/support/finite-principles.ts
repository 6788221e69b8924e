/**
 * What the obligations of a principle say, worked out on a finite structure with sets and counts: for each kind of
 * obligation whether those of that kind should be true. It shares with the program the evaluation of δ, φ and `given`
 * by nested loops and nothing else.
 */
import type { CountedRelation, ObligationKind, PrincipleRecord } from "../../lib/logic/records/finiteness.ts";
import type { FormulaRecord } from "../../lib/logic/records/formulas.ts";
import { type Interpretation, isTrue } from "./evidence-judge.ts";

type Kinds = Partial<Record<ObligationKind, boolean>>;

/** The kinds that a principle asks for, and whether they hold. */
export function kindsByCounting(principle: PrincipleRecord, over: Interpretation): Kinds {
  const points = Array.from({ length: over.size }, (_, point) => point);
  const { parameters, given } = principle;
  let choices: number[][] = [[]];
  for (const _ of parameters)
    choices = choices.flatMap((choice) => points.map((point) => [...choice, point]));
  const chosen = choices
    .map((choice) => new Map(parameters.map((name, place) => [name, choice[place]!])))
    .filter((values) => given === null || isTrue(given, over, values));
  const result: Kinds = {};
  if (given !== null && given[0] !== "true") result.parameters = chosen.length > 0;
  for (const values of chosen)
    for (const [kind, holds] of Object.entries(conditions(principle, over, values)) as [
      ObligationKind,
      boolean,
    ][])
      result[kind] = (result[kind] ?? true) && holds;
  return result;
}

function conditions(
  principle: PrincipleRecord,
  over: Interpretation,
  values: ReadonlyMap<string, number>,
): Kinds {
  const points = Array.from({ length: over.size }, (_, point) => point);
  const at = (formula: FormulaRecord, own: Record<string, number>) =>
    isTrue(formula, over, new Map([...values, ...Object.entries(own)]));
  const domain = points.filter((x) => at(principle.domain, { x }));
  const related = (x: number, y: number, z = 0) => at(principle.relation, { x, y, z });
  const isEverything = principle.domain[0] === "true";
  const classOf = (point: number) =>
    principle.principle === "endless-order" || principle.different === "identity"
      ? point
      : points.findIndex((other) =>
          isAlike(principle.different as readonly CountedRelation[], point, other, over),
        );
  const count = (some: readonly number[]) => new Set(some.map(classOf)).size;
  switch (principle.principle) {
    case "endless-order": {
      const all = principle.everywhere ? points : domain;
      return {
        ...(isEverything ? {} : { size: domain.length > 0 }),
        irreflexive: all.every((x) => !related(x, x)),
        transitive: all.every((x) =>
          all.every((y) => !related(x, y) || all.every((z) => !related(y, z) || related(x, z))),
        ),
        successors: domain.every((x) => domain.some((y) => related(x, y))),
      };
    }
    case "counting": {
      const { successors: k, predecessors: j, spare } = principle;
      const after = (x: number) => count(domain.filter((y) => related(x, y)));
      const before = (y: number, of = domain) => count(of.filter((x) => related(x, y)));
      const all = principle.everywhere ? points : domain;
      return {
        ...(isEverything || spare !== null ? {} : { size: domain.length > 0 }),
        successors: domain.every((x) => after(x) >= k),
        predecessors: all.every((y) => before(y, all) <= j),
        ...(spare === null
          ? {}
          : {
              spare:
                spare === "fewer-predecessors"
                  ? domain.some((y) => before(y) <= k - 1)
                  : domain.some((x) => after(x) >= k + 1),
            }),
      };
    }
    case "pairs": {
      const couples = domain.flatMap((x) => domain.map((y) => [x, y] as const));
      const stands = (z: number) =>
        new Set(couples.filter(([x, y]) => related(x, y, z)).map(([x, y]) => `${classOf(x)} ${classOf(y)}`))
          .size;
      return {
        values: couples.every(([x, y]) => domain.some((z) => related(x, y, z))),
        predecessors: domain.every((z) => stands(z) <= principle.pairs),
        size: count(domain) > principle.pairs,
      };
    }
    case "comprehension": {
      const before = (z: number) => domain.filter((w) => related(w, z));
      return {
        spare: domain.some((y) => before(y).length === 0),
        values: domain.every((x) =>
          domain.every((y) => {
            const wanted = domain.filter((w) => before(x).includes(w) || classOf(w) === classOf(y));
            return domain.some((z) => before(z).join() === wanted.join());
          }),
        ),
      };
    }
  }
}

/** Whether relations hold of one point just where they hold of the other. */
function isAlike(
  relations: readonly CountedRelation[],
  one: number,
  other: number,
  over: Interpretation,
): boolean {
  const points = Array.from({ length: over.size }, (_, point) => point);
  return relations.every(([name, places]) => {
    let rests: number[][] = [[]];
    for (let i = 1; i < places; i += 1)
      rests = rests.flatMap((rest) => points.map((point) => [...rest, point]));
    return Array.from({ length: places }, (_, place) => place).every((place) =>
      rests.every(
        (rest) =>
          over.holds(name, rest.toSpliced(place, 0, one)) ===
          over.holds(name, rest.toSpliced(place, 0, other)),
      ),
    );
  });
}
