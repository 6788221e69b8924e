/** What has been found out about a theory and the named properties, and how `describe` shows it. */
import { type Block, code, type Inline, note } from "./blocks.ts";
import { counted, onSizesTo } from "./text.ts";

/** A search for models of one kind, size by size from 1. */
export type ModelSearch =
  /** A model was found, on so many points; no smaller one where the sizes before it were finished. */
  | { readonly kind: "found"; readonly size: number }
  /** There is none on 1, …, this many points; 0 when not even one point was finished. */
  | { readonly kind: "none"; readonly upTo: number };

/** Models of a theory with a property, and models of it without. Neither search can show that it is implied. */
export interface PropertyFinding {
  /** The property as the cell language writes it: `transitive(R)`. */
  readonly name: string;
  readonly having: ModelSearch;
  readonly lacking: ModelSearch;
}

/** What `describe` is given besides the theory. */
export interface Findings {
  /** In the order in which they are to be shown. */
  readonly properties: readonly PropertyFinding[];
  /** Whether the checker accepted every model that was found. */
  readonly checked: boolean;
  /** Whether the budget ended, or the user interrupted, before all properties were looked at. */
  readonly endedEarly: boolean;
}

/** The word for a finding in `eval --json`. */
export type PropertyStatus = "neither" | "no-countermodel" | "no-example" | "no-model" | "unsearched";

/**
 * `neither`: there are models with the property and models without; `no-countermodel`: none without it up to the
 * size searched; `no-example`: none with it up to that size; `no-model`: none at all; `unsearched`: a search did not
 * finish even one point.
 */
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
    modelWith: sizeData(finding.having),
    modelWithout: sizeData(finding.lacking),
  }));
}

function sizeData(search: ModelSearch): Readonly<Record<string, unknown>> {
  return search.kind === "found"
    ? { size: search.size, noneUpTo: null }
    : { size: null, noneUpTo: search.upTo };
}

/** One line for each kind of finding, and all of them in a table that is closed at first. */
export function findingBlocks(findings: Findings): readonly Block[] {
  const { properties, checked, endedEarly } = findings;
  if (properties.length === 0) return [];
  const rows = [...groupsOf(properties)].map(([title, names]) => [[title], listed(names)]);
  const blocks: Block[] = [
    { kind: "table", caption: "Named properties", head: ["found", "properties"], rows, look: "prose" },
  ];
  if (properties.some((finding) => propertyStatus(finding) !== "neither"))
    blocks.push(
      note("That no model of some sizes has or lacks a property does not derive it, nor exclude it."),
    );
  if (endedEarly) blocks.push(note("The budget ended before all properties had been looked at."));
  blocks.push({
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

/** Names by what is known of them; sizes belong to the title, so that no line says more than was searched. */
function groupsOf(properties: readonly PropertyFinding[]): ReadonlyMap<string, readonly string[]> {
  const groups = new Map<string, string[]>();
  const order: PropertyStatus[] = ["no-countermodel", "no-example", "no-model", "neither", "unsearched"];
  for (const status of order)
    for (const finding of properties) {
      if (propertyStatus(finding) !== status) continue;
      const title = titleOf(finding, status);
      groups.set(title, [...(groups.get(title) ?? []), finding.name]);
    }
  return groups;
}

function titleOf({ having, lacking }: PropertyFinding, status: PropertyStatus): string {
  const sizes = (search: ModelSearch) => (search.kind === "none" ? onSizesTo(search.upTo) : "");
  switch (status) {
    case "no-countermodel":
      return `no model without it ${sizes(lacking)}`;
    case "no-example":
      return `no model with it ${sizes(having)}`;
    case "no-model": {
      const least =
        having.kind === "none" && lacking.kind === "none" ? Math.min(having.upTo, lacking.upTo) : 0;
      return `no model at all ${onSizesTo(least)}`;
    }
    case "neither":
      return "neither implied nor excluded";
    case "unsearched":
      return "not searched";
  }
}

function listed(names: readonly string[]): readonly Inline[] {
  return names.flatMap((name, index): Inline[] => (index === 0 ? [code(name)] : [", ", code(name)]));
}

function searchText(search: ModelSearch, checked: boolean): string {
  if (search.kind === "found") return `on ${counted(search.size, "point")}${checked ? " (checked)" : ""}`;
  return search.upTo === 0 ? "not searched" : `none ${onSizesTo(search.upTo)}`;
}
