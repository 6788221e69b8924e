/** What has been found out about a theory and the named properties, as `describe` shows it. */
import type { Findings, ModelSearch, PropertyFinding } from "../../lib/inquiry/examine.ts";
import type { FiniteCheck } from "../../lib/logic/fragments.ts";
import { type Block, code, type Inline, note } from "./blocks.ts";
import { counted, onSizesTo } from "./text.ts";

/**
 * The word for a finding in `eval --json`. `neither`: there are models with the property and models without;
 * `no-countermodel`: none without it up to the size searched; `no-example`: none with it up to that size;
 * `no-model`: none with it and none without; `unsearched`: a search did not finish even one point.
 */
export type PropertyStatus = "neither" | "no-countermodel" | "no-example" | "no-model" | "unsearched";

export function propertyStatus({ having, lacking }: PropertyFinding): PropertyStatus {
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
  return search.kind === "found"
    ? { size: search.size, noneUpTo: null, decided: false }
    : { size: null, noneUpTo: search.upTo, decided: search.decided !== null };
}

/** One line for each kind of finding, and all of them in a table that is closed at first. */
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
  const rows = [...groupsOf(properties)].map(([title, names]) => [[title], listed(names)]);
  const checked = evidence === null ? "" : " (checked)";
  const blocks: Block[] = [
    { kind: "table", caption: "Named properties", head: ["found", "properties"], rows, look: "prose" },
  ];
  if (properties.some((finding) => isUndecided(finding)))
    blocks.push(note("That models of some sizes all have a property, or all lack it, derives nothing."));
  for (const { points, reason, source } of checksIn(properties))
    blocks.push(note(`Decided by a finite check up to ${counted(points, "point")}: ${reason} (${source}).`));
  blocks.push(...early, {
    kind: "fold",
    title: `Sizes of the models, for ${counted(properties.length, "property", "properties")}`,
    blocks: [
      {
        kind: "table",
        caption: null,
        head: ["property", "a model with it", "a model without it"],
        rows: properties.map(({ name, having, lacking }) => [
          [code(name)],
          [searchText(having, checked)],
          [searchText(lacking, checked)],
        ]),
        look: "prose",
      },
    ],
  });
  return blocks;
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

/** The bounds that were used, each once. */
function checksIn(properties: readonly PropertyFinding[]): readonly FiniteCheck[] {
  const checks = new Map<string, FiniteCheck>();
  for (const { having, lacking } of properties)
    for (const check of [decidedBy(having), decidedBy(lacking)])
      if (check !== null) checks.set(`${check.points};${check.reason}`, check);
  return [...checks.values()].sort((a, b) => a.points - b.points);
}

/** Names by what is known of them; sizes belong to the title, so that no line says more than was searched. */
function groupsOf(properties: readonly PropertyFinding[]): ReadonlyMap<string, readonly string[]> {
  const groups = new Map<string, string[]>();
  const order: PropertyStatus[] = ["no-countermodel", "no-example", "no-model", "neither", "unsearched"];
  for (const status of order) {
    const found = properties.filter((finding) => propertyStatus(finding) === status);
    // What a finite check decided stands before what was searched on some sizes only.
    const titles = found.map((finding) => ({ name: finding.name, title: titleOf(finding, status) }));
    for (const isFirst of [true, false])
      for (const { name, title } of titles)
        if (title.endsWith(DECIDED) === isFirst) groups.set(title, [...(groups.get(title) ?? []), name]);
  }
  return groups;
}

const DECIDED = "by a finite check";

function titleOf({ having, lacking }: PropertyFinding, status: PropertyStatus): string {
  const where = (search: ModelSearch) => {
    if (search.kind === "found") return "";
    return search.decided === null ? ` ${onSizesTo(search.upTo)}` : `, ${DECIDED}`;
  };
  switch (status) {
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
      return "models with it and models without it";
    case "unsearched":
      return "not searched";
  }
}

function listed(names: readonly string[]): readonly Inline[] {
  return names.flatMap((name, index): Inline[] => (index === 0 ? [code(name)] : [", ", code(name)]));
}

function searchText(search: ModelSearch, checked: string): string {
  if (search.kind === "found") return `on ${counted(search.size, "point")}${checked}`;
  if (search.upTo === 0) return "not searched";
  return search.decided === null ? `none ${onSizesTo(search.upTo)}` : `none, ${DECIDED}`;
}
