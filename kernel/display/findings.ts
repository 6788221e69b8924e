/** What has been found out about a theory and the named properties, as `describe` shows it. */
import type { Findings, ModelSearch, PropertyFinding } from "../../lib/inquiry/examine.ts";
import type { FiniteCheck } from "../../lib/logic/fragments.ts";
import { type Block, type Inline, line, note } from "./blocks.ts";
import { counted, onSizesTo } from "./text.ts";

/**
 * The word for a finding in `eval --json`. `follows`: it is derived that all models have it; `excluded`: that none has
 * it; `neither`: there are models with the property and models without;
 * `no-countermodel`: none without it up to the size searched; `no-example`: none with it up to that size;
 * `no-model`: none with it and none without; `unsearched`: a search did not finish even one point.
 */
export type PropertyStatus =
  | "follows"
  | "excluded"
  | "neither"
  | "no-countermodel"
  | "no-example"
  | "no-model"
  | "unsearched";

export function propertyStatus({ having, lacking }: PropertyFinding): PropertyStatus {
  if (lacking.kind === "derived") return "follows";
  if (having.kind === "derived") return "excluded";
  if (having.kind === "found" && lacking.kind === "found") return "neither";
  if ((having.kind === "none" && having.upTo === 0) || (lacking.kind === "none" && lacking.upTo === 0))
    return "unsearched";
  if (having.kind === "found") return "no-countermodel";
  return lacking.kind === "found" ? "no-example" : "no-model";
}

/** For `eval --json`. */
export function findingsData({ properties }: Findings): readonly Readonly<Record<string, unknown>>[] {
  return properties.map((finding) => ({
    property: finding.name,
    status: propertyStatus(finding),
    modelWith: searchData(finding.having),
    modelWithout: searchData(finding.lacking),
  }));
}

function searchData(search: ModelSearch): Readonly<Record<string, unknown>> {
  if (search.kind === "derived") return { size: null, noneUpTo: null, decided: true };
  return search.kind === "found"
    ? {
        size: search.size,
        ...(search.size === null ? { infinite: true } : {}),
        noneUpTo: null,
        decided: false,
      }
    : { size: null, noneUpTo: search.upTo, decided: search.decided !== null };
}

/** A row for each kind of finding; properties that some models have and others lack are closed at first. */
export function findingBlocks(findings: Findings): readonly Block[] {
  const { properties, evidence, endedEarly, interrupted } = findings;
  const early = endedEarly
    ? [
        note(
          `${interrupted ? "Interrupted" : "The budget ended"} before all named properties had been looked at.`,
        ),
      ]
    : [];
  if (properties.length === 0) return early;
  const subject = soleSubject(properties);
  const nameOf = ({ name }: PropertyFinding) =>
    subject === null ? name : name.slice(0, -subject.length - 2);
  const settled = properties.filter((finding) => propertyStatus(finding) === "neither");
  const groups = [...groupsOf(properties.filter((finding) => propertyStatus(finding) !== "neither"))];
  const blocks: Block[] = [];
  if (groups.length > 0)
    blocks.push({
      kind: "table",
      caption: `Named properties${subject === null ? "" : ` of ${subject}`}`,
      head: ["found", "properties"],
      rows: groups.map(([title, found]) => [[title], listed(found.map(nameOf))]),
      look: "prose",
    });
  if (properties.some(isUndecided))
    blocks.push(note("That models of some sizes all have a property, or all lack it, derives nothing."));
  blocks.push(...checkNotes(properties), ...early);
  if (settled.length > 0)
    blocks.push({
      kind: "fold",
      title: `${counted(settled.length, "property", "properties")} that a model has and another lacks${
        evidence === null ? "" : " (checked)"
      }${settled.some(hasFinite) ? ", with the points of each" : ", both infinite"}`,
      blocks: [line(...sized(settled, nameOf))],
    });
  return blocks;
}

/** The relation that all properties are said of; null when there are several. */
function soleSubject(properties: readonly PropertyFinding[]): string | null {
  const subjects = new Set(properties.map(({ name }) => /\((.*)\)$/.exec(name)?.[1] ?? ""));
  const [first] = subjects;
  return subjects.size === 1 && first !== undefined && first !== "" ? first : null;
}

function hasFinite({ having, lacking }: PropertyFinding): boolean {
  return [having, lacking].some((search) => search.kind === "found" && search.size !== null);
}

function sized(
  properties: readonly PropertyFinding[],
  nameOf: (finding: PropertyFinding) => string,
): readonly Inline[] {
  return properties.flatMap((finding, index): Inline[] => {
    const { having, lacking } = finding;
    const sizes = [having, lacking].flatMap((search) =>
      search.kind === "found" ? [search.size ?? "infinite"] : [],
    );
    const places = sizes.every((size) => size === "infinite") ? "" : ` (${sizes.join(";\u00a0")})`;
    return [index === 0 ? "" : ", ", nameOf(finding) + places];
  });
}

function isUndecided(finding: PropertyFinding): boolean {
  const status = propertyStatus(finding);
  if (status === "no-countermodel") return decidedBy(finding.lacking) === null;
  if (status === "no-example") return decidedBy(finding.having) === null;
  return status === "no-model";
}

function decidedBy(search: ModelSearch): FiniteCheck | null {
  return search.kind === "none" ? search.decided : null;
}

/** The bounds that were used, each reason once. */
function checkNotes(properties: readonly PropertyFinding[]): readonly Block[] {
  const reasons = new Map<string, FiniteCheck>();
  for (const { having, lacking } of properties)
    for (const check of [decidedBy(having), decidedBy(lacking)]) {
      if (check === null) continue;
      const known = reasons.get(check.reason);
      if (known === undefined || known.points < check.points) reasons.set(check.reason, check);
    }
  return [...reasons.values()].map(({ points, reason, source }) =>
    note(
      `Finite checks went up to ${counted(points, "point")} and decide by a published bound: ${reason} (${source}).`,
    ),
  );
}

/** Names by what is known of them; sizes belong to the title, so that no line says more than was searched. */
function groupsOf(properties: readonly PropertyFinding[]): ReadonlyMap<string, readonly PropertyFinding[]> {
  const groups = new Map<string, PropertyFinding[]>();
  const order: PropertyStatus[] = [
    "follows",
    "excluded",
    "no-countermodel",
    "no-example",
    "no-model",
    "unsearched",
  ];
  for (const status of order) {
    const found = properties.filter((finding) => propertyStatus(finding) === status);
    // What a finite check decided stands before what was searched on some sizes only.
    for (const isFirst of [true, false])
      for (const finding of found) {
        const title = titleOf(finding, status);
        if (title.endsWith(DECIDED) === isFirst) groups.set(title, [...(groups.get(title) ?? []), finding]);
      }
  }
  return groups;
}

const DECIDED = "by a finite check";

function titleOf({ having, lacking }: PropertyFinding, status: PropertyStatus): string {
  const where = (search: ModelSearch) => {
    if (search.kind !== "none") return "";
    return search.decided === null ? ` ${onSizesTo(search.upTo)}` : `, ${DECIDED}`;
  };
  switch (status) {
    case "follows":
      return "follow (derived, checked)";
    case "excluded":
      return "no model has it (derived, checked)";
    case "no-countermodel":
      return `no model without it${where(lacking)}`;
    case "no-example":
      return `no model with it${where(having)}`;
    case "no-model": {
      const least =
        having.kind === "none" && lacking.kind === "none" ? Math.min(having.upTo, lacking.upTo) : 0;
      return `no model, with it or without, ${onSizesTo(least)}`;
    }
    case "neither":
      return "models with it and without it";
    case "unsearched":
      return "not searched";
  }
}

function listed(names: readonly string[]): readonly Inline[] {
  return [names.join(", ")];
}
