/** What stands at the cursor, as front ends show it beside the cell. */
import type { Inspection } from "../../lib/language/inspection.ts";
import type { Definition, DescribeSubject } from "../../lib/language/statements.ts";
import type { MimeBundle } from "../session/evaluator.ts";
import { type Block, code, line } from "./blocks.ts";
import { renderBundle } from "./bundle.ts";
import { describeSubject } from "./definitions.ts";
import { theoryTable } from "./theories.ts";

/**
 * The bundle for what was found; {@link prepareDrawing} must have been awaited.
 * @param detail 0 for how it is written and what it means, 1 for all that `describe` says of it as well
 */
export function showInspection(found: Inspection, detail: 0 | 1): MimeBundle {
  const blocks: Block[] = [line(code(found.signature)), line(found.meaning)];
  if (found.kind === "definition") {
    const { definition } = found;
    if (detail === 1) blocks.push(...describeSubject(subjectOf(definition)).blocks);
    else if (definition.kind === "theory") blocks.push(theoryTable(null, definition.theory));
  }
  return renderBundle(blocks, "without-latex");
}

function subjectOf(definition: Definition): DescribeSubject {
  const text = definition.name;
  switch (definition.kind) {
    case "theory":
      return { kind: "theory", theory: { text, theory: definition.theory } };
    case "structure":
      return { kind: "structure", structure: { text, structure: definition.structure } };
    case "formula":
      return { kind: "formula", definition };
  }
}
