/** The user's mistakes, as data. */

/** A stretch of cell text, in code points from its beginning. */
export interface Place {
  readonly from: number;
  /** One past the last code point; never less than `from`. */
  readonly to: number;
}

/** One mistake: where it is, what was expected or found there, and what to write instead. */
export interface Diagnostic extends Place {
  /** Stable and made of lower-case words: `unknown-name`, `places-differ`, … */
  readonly code: string;
  /** For people; says the actual names and numbers. */
  readonly message: string;
  /** What to do or to write instead; null when nothing can be proposed. */
  readonly suggestion: string | null;
}
