/**
 * Bundles for front ends. Which form wins differs between them, so that every form stands by itself: plain text
 * always, HTML always, LaTeX where a draft can use it. Nothing is sent as JSON or SVG: either would hide the table in
 * one front end or another.
 */
import type { Progress } from "../../lib/inquiry/answer.ts";
import type { MimeBundle } from "../session/evaluator.ts";
import type { Block } from "./blocks.ts";
import { type Inline, line } from "./blocks.ts";
import { counted, grouped } from "./text.ts";
import { blocksToHtml } from "./to-html.ts";
import { blocksToLatex, inlineToLatex } from "./to-latex.ts";
import { inlineToMarkdown } from "./to-markdown.ts";
import { blocksToText, inlineToText } from "./to-text.ts";

/** The same blocks give the same bytes. */
export function renderBundle(blocks: readonly Block[], forms: "with-latex" | "without-latex"): MimeBundle {
  const bundle = { "text/plain": blocksToText(blocks), "text/html": blocksToHtml(blocks) };
  return forms === "with-latex" ? { ...bundle, "text/latex": blocksToLatex(blocks) } : bundle;
}

/** How far a running question is; overwritten by its answer. */
export function showProgress(progress: Progress): MimeBundle {
  const text = `working: ${progress.doing}; ${grouped(progress.steps)} of ${counted(progress.limit, "step")}`;
  return renderBundle([line(text)], "without-latex");
}

/** A value for the middle of a sentence, as `user_expressions` ask for it: short, and without a look of its own. */
export function showInline(...parts: Inline[]): MimeBundle {
  return {
    "text/plain": inlineToText(parts),
    "text/markdown": inlineToMarkdown(parts),
    "text/latex": inlineToLatex(parts),
  };
}
