/**
 * The signs and words of the cell language, as data. The lexer, the printer, completion, inspection and the
 * highlighter of the notebook page all work from these tables, so that a spelling is added in one place.
 */

/** What a sign stands for, whichever way it is spelled. */
export type SignKind =
  | "forall"
  | "exists"
  | "not"
  | "and"
  | "or"
  | "implies"
  | "iff"
  | "equal"
  | "not-equal"
  | "true"
  | "false"
  | "entails"
  | "does-not-entail"
  | "assign"
  | "colon"
  | "dot"
  | "comma"
  | "semicolon"
  | "open"
  | "close"
  | "open-brace"
  | "close-brace"
  | "plus"
  | "minus"
  | "inverse"
  | "complement"
  | "composition"
  | "intersection"
  | "union"
  | "included";

export type SignRole =
  | "quantifier"
  | "connective"
  | "constant"
  | "comparison"
  | "entailment"
  | "operator"
  | "separator"
  | "term"
  | "postfix"
  | "bracket";

export interface Sign {
  readonly kind: SignKind;
  /** As the printer writes it in Unicode, and as messages quote it. */
  readonly symbol: string;
  /** Other spellings, the printer's ASCII one first. Those that begin with a letter are whole words. */
  readonly ascii: readonly string[];
  /** LaTeX commands, the printer's one first. */
  readonly latex: readonly string[];
  readonly role: SignRole;
  /** One sentence for inspection. */
  readonly meaning: string;
}

export const signs: readonly Sign[] = [
  {
    kind: "forall",
    symbol: "∀",
    ascii: ["forall"],
    latex: ["\\forall"],
    role: "quantifier",
    meaning: "For every element. `∀x y. φ` reaches as far right as it can; without the dot it binds like ¬.",
  },
  {
    kind: "exists",
    symbol: "∃",
    ascii: ["exists"],
    latex: ["\\exists"],
    role: "quantifier",
    meaning: "For some element. `∃x y. φ` reaches as far right as it can; without the dot it binds like ¬.",
  },
  {
    kind: "not",
    symbol: "¬",
    ascii: ["~", "not"],
    latex: ["\\neg", "\\lnot"],
    role: "connective",
    meaning: "Negation; binds more tightly than ∧.",
  },
  {
    kind: "and",
    symbol: "∧",
    ascii: ["&", "and"],
    latex: ["\\wedge", "\\land", "\\and"],
    role: "connective",
    meaning: "Conjunction; binds more tightly than ∨.",
  },
  {
    kind: "or",
    symbol: "∨",
    ascii: ["|", "or"],
    latex: ["\\vee", "\\lor", "\\or"],
    role: "connective",
    meaning: "Disjunction; binds more tightly than →.",
  },
  {
    kind: "implies",
    symbol: "→",
    ascii: ["->"],
    latex: ["\\to", "\\rightarrow", "\\implies"],
    role: "connective",
    meaning: "The conditional; groups to the right and binds more tightly than ↔.",
  },
  {
    kind: "iff",
    symbol: "↔",
    ascii: ["<->"],
    latex: ["\\leftrightarrow", "\\iff"],
    role: "connective",
    meaning: "The biconditional; groups to the right and binds least tightly.",
  },
  {
    kind: "equal",
    symbol: "=",
    ascii: [],
    latex: [],
    role: "comparison",
    meaning: "Identity of two elements.",
  },
  {
    kind: "not-equal",
    symbol: "≠",
    ascii: ["!="],
    latex: ["\\neq", "\\ne"],
    role: "comparison",
    meaning: "Two elements are different: the negation of =.",
  },
  {
    kind: "true",
    symbol: "⊤",
    ascii: ["true"],
    latex: ["\\top"],
    role: "constant",
    meaning: "The sentence that is true in every structure.",
  },
  {
    kind: "false",
    symbol: "⊥",
    ascii: ["false"],
    latex: ["\\bot"],
    role: "constant",
    meaning: "The sentence that is false in every structure.",
  },
  {
    kind: "entails",
    symbol: "⊨",
    ascii: ["|="],
    latex: ["\\models", "\\vDash"],
    role: "entailment",
    meaning:
      "The sentence on the right is true in every model of the theory, or in the structure, on the left.",
  },
  {
    kind: "does-not-entail",
    symbol: "⊭",
    ascii: ["does-not-entail"],
    latex: ["\\nvDash", "\\nmodels"],
    role: "entailment",
    meaning:
      "Some model of the theory on the left, or the structure there, makes the sentence on the right false.",
  },
  {
    kind: "assign",
    symbol: ":=",
    ascii: ["≔"],
    latex: ["\\coloneqq"],
    role: "operator",
    meaning: "Gives the name on the left to what stands on the right.",
  },
  {
    kind: "colon",
    symbol: ":",
    ascii: [],
    latex: ["\\colon"],
    role: "separator",
    meaning: "Stands after the label of an axiom.",
  },
  {
    kind: "dot",
    symbol: ".",
    ascii: [],
    latex: [],
    role: "separator",
    meaning: "Ends a list of quantified variables; between a theory and a label it picks out one axiom.",
  },
  {
    kind: "comma",
    symbol: ",",
    ascii: [],
    latex: [],
    role: "separator",
    meaning: "Stands between the parts of a list.",
  },
  {
    kind: "semicolon",
    symbol: ";",
    ascii: [],
    latex: [],
    role: "separator",
    meaning: "Stands between axioms or between statements, as the end of a line does.",
  },
  { kind: "open", symbol: "(", ascii: [], latex: [], role: "bracket", meaning: "Opens a bracket." },
  { kind: "close", symbol: ")", ascii: [], latex: [], role: "bracket", meaning: "Closes a bracket." },
  {
    kind: "open-brace",
    symbol: "{",
    ascii: [],
    latex: ["\\{"],
    role: "bracket",
    meaning: "Opens the axioms of a theory or the tuples of a relation.",
  },
  {
    kind: "close-brace",
    symbol: "}",
    ascii: [],
    latex: ["\\}"],
    role: "bracket",
    meaning: "Closes the axioms of a theory or the tuples of a relation.",
  },
  {
    kind: "plus",
    symbol: "+",
    ascii: [],
    latex: [],
    role: "operator",
    meaning: "All axioms of two theories together.",
  },
  {
    kind: "minus",
    symbol: "-",
    ascii: ["−"],
    latex: [],
    role: "operator",
    meaning:
      "A theory without the axiom of that label; spaces around the sign, since names may have hyphens.",
  },
  {
    kind: "inverse",
    symbol: "⁻¹",
    ascii: ["inv", "^-1"],
    latex: ["^{-1}"],
    role: "postfix",
    meaning: "The converse of a relation: `R⁻¹`, or `inv(R)`, relates x to y where R relates y to x.",
  },
  {
    kind: "complement",
    symbol: "∁",
    ascii: ["co"],
    latex: ["\\complement"],
    role: "term",
    meaning:
      "The complement of a relation: `∁R`, or `co(R)`, holds where R does not. Binds like ⁻¹, less tightly.",
  },
  {
    kind: "composition",
    symbol: "∘",
    ascii: ["o"],
    latex: ["\\circ"],
    role: "term",
    meaning: "Composition: `R ∘ S` relates x to y by way of some z, Rxz and Szy. Binds more tightly than ∩.",
  },
  {
    kind: "intersection",
    symbol: "∩",
    ascii: ["cap"],
    latex: ["\\cap"],
    role: "term",
    meaning: "The intersection of two relations: both hold. Binds more tightly than ∪.",
  },
  {
    kind: "union",
    symbol: "∪",
    ascii: ["cup"],
    latex: ["\\cup"],
    role: "term",
    meaning: "The union of two relations: one of them holds.",
  },
  {
    kind: "included",
    symbol: "⊆",
    ascii: ["sub"],
    latex: ["\\subseteq"],
    role: "comparison",
    meaning:
      "Inclusion of relations: `R ⊆ S` says that S holds wherever R does; `R = S` that both hold alike.",
  },
];

const byKind = new Map(signs.map((sign) => [sign.kind, sign]));

/** The table's entry for a kind. */
export function signOf(kind: SignKind): Sign {
  return byKind.get(kind)!;
}

/** A relation symbol that has LaTeX commands; any of them may be declared with `relation ≺ infix`. */
export interface RelationSign {
  readonly symbol: string;
  /** The printer's one first. */
  readonly latex: readonly string[];
}

export const relationSigns: readonly RelationSign[] = [
  { symbol: "<", latex: ["\\lt"] },
  { symbol: ">", latex: ["\\gt"] },
  { symbol: "≤", latex: ["\\leq", "\\le"] },
  { symbol: "≥", latex: ["\\geq", "\\ge"] },
  { symbol: "≺", latex: ["\\prec"] },
  { symbol: "≻", latex: ["\\succ"] },
  { symbol: "⪯", latex: ["\\preceq"] },
  { symbol: "⪰", latex: ["\\succeq"] },
  { symbol: "≼", latex: ["\\preccurlyeq"] },
  { symbol: "≽", latex: ["\\succcurlyeq"] },
  { symbol: "≪", latex: ["\\ll"] },
  { symbol: "≫", latex: ["\\gg"] },
  { symbol: "⊏", latex: ["\\sqsubset"] },
  { symbol: "⊐", latex: ["\\sqsupset"] },
  { symbol: "⊑", latex: ["\\sqsubseteq"] },
  { symbol: "⊒", latex: ["\\sqsupseteq"] },
  { symbol: "⊂", latex: ["\\subset"] },
  { symbol: "⊃", latex: ["\\supset"] },
  { symbol: "⊲", latex: ["\\vartriangleleft"] },
  { symbol: "⊳", latex: ["\\vartriangleright"] },
  { symbol: "⊴", latex: ["\\trianglelefteq"] },
  { symbol: "⊵", latex: ["\\trianglerighteq"] },
  { symbol: "∼", latex: ["\\sim"] },
  { symbol: "≃", latex: ["\\simeq"] },
  { symbol: "≈", latex: ["\\approx"] },
  { symbol: "≅", latex: ["\\cong"] },
  { symbol: "≡", latex: ["\\equiv"] },
  { symbol: "∈", latex: ["\\in"] },
  { symbol: "∋", latex: ["\\ni"] },
  { symbol: "∣", latex: ["\\mid"] },
  { symbol: "∥", latex: ["\\parallel"] },
  { symbol: "⋈", latex: ["\\bowtie"] },
  { symbol: "⇝", latex: ["\\leadsto"] },
  { symbol: "↦", latex: ["\\mapsto"] },
  { symbol: "⊢", latex: ["\\vdash"] },
  { symbol: "⊣", latex: ["\\dashv"] },
];

/** Symbols that would be mistaken for parts of a sign; they cannot be declared. */
export const keptSymbols: ReadonlySet<string> = new Set(["⁻"]);

/** What people write for a sign of ours, and the sign; for suggestions only. */
export const mistakenSigns: ReadonlyMap<string, string> = new Map([
  ["&&", "∧ or &"],
  ["||", "∨ or |"],
  ["=>", "→ or ->"],
  ["⇒", "→ or ->"],
  ["⟶", "→ or ->"],
  ["⟹", "→ or ->"],
  ["⊃", "→ or ->"],
  ["<=>", "↔ or <->"],
  ["⇔", "↔ or <->"],
  ["⟺", "↔ or <->"],
  ["≡", "↔ or <->"],
  ["==", "="],
  ["<>", "≠ or !="],
  ["!", "¬ or ~"],
  ["∼", "¬ or ~"],
  ["⋀", "∧ or &"],
  ["⋁", "∨ or |"],
  ["⊢", "⊨ or |="],
  ["⊩", "⊨ or |="],
  ["[", "( and )"],
  ["]", "( and )"],
  ["∄", "¬∃"],
  ["∖", "- between spaces"],
  ["–", "- between spaces"],
  ["—", "- between spaces"],
  ["×", "(1,2), the pairs themselves"],
]);

/** Signs of several characters that are read as one, longest first. */
export const clusters: readonly string[] = [
  "^{-1}",
  "^-1",
  "⁻¹",
  "<->",
  "<=>",
  "->",
  "!=",
  ":=",
  "|=",
  "||",
  "&&",
  "==",
  "=>",
  "<=",
  ">=",
  "<<",
  ">>",
  "<>",
];

/** A word of the language that is no statement and no sign, with the place it has. */
export interface Keyword {
  readonly word: string;
  readonly meaning: string;
}

export const keywords: readonly Keyword[] = [
  { word: "infix", meaning: "`relation ≺ infix`: the relation stands between its two arguments." },
  { word: "of", meaning: "`relation Between of 3 places`, `models T of size 4`." },
  { word: "place", meaning: "`relation P of 1 place`: how many arguments the relation has." },
  { word: "places", meaning: "`relation Between of 3 places`: how many arguments the relation has." },
  { word: "size", meaning: "`models T of size 4`: how many points the models have." },
  {
    word: "points",
    meaning:
      "`points 3 where R is { (1,2) }`: the structure whose points are 1, 2 and 3; `at-most 3 points`.",
  },
  {
    word: "where",
    meaning:
      "`points 3 where R is { (1,2) }`, `dense-line where Rxy iff x < y`: says of what the relations hold.",
  },
  { word: "is", meaning: "`claim T is consistent`; `where R is { (1,2) }`." },
  { word: "has", meaning: "`claim T has no finite model`." },
  { word: "converse", meaning: "`converse(T)`: the theory with every two-place relation read backwards." },
  {
    word: "complement",
    meaning: "`complement(T)`: the theory with every two-place relation replaced by its complement.",
  },
  { word: "replacing", meaning: "`T replacing label by φ`: the theory with another axiom under that label." },
  { word: "by", meaning: "`T replacing label by φ`: the theory with another axiom under that label." },
  { word: "up", meaning: "`up to 8`: the largest number of points that is tried." },
  { word: "to", meaning: "`up to 8`: the largest number of points that is tried." },
  { word: "within", meaning: "`within 50000 steps`: the budget of the question." },
  { word: "steps", meaning: "`within 50000 steps`: the budget of the question." },
  {
    word: "with",
    meaning: "`count T up to 5 with representatives`; `normalise φ to prenex form with steps`.",
  },
  {
    word: "representatives",
    meaning: "`with representatives`: one model of each class of isomorphic ones is shown.",
  },
  { word: "form", meaning: "`normalise φ to prenex form`." },
  { word: "as", meaning: "`write T as SMT-LIB`." },
  {
    word: "smt-lib",
    meaning:
      "`define T := smt-lib { (declare-sort U 0) … }`: sentences of SMT-LIB 2.6 over one sort with relations alone.",
  },
  {
    word: "id",
    meaning: "The identity relation, in relation terms: it relates every element to itself alone.",
  },
  { word: "full", meaning: "The relation, in relation terms, that relates every element to every element." },
  { word: "none", meaning: "The relation, in relation terms, that relates no elements." },
  { word: "point", meaning: "`exactly 1 point`: how many elements there are." },
  {
    word: "iff",
    meaning:
      "`dense-line where Rxy iff x < y`: the relation holds of those elements of which the formula is true.",
  },
];

/** A spelling of a sign or a relation symbol, for completion: `\fora` offers `∀`. */
export interface Spelling {
  /** As typed: `\forall`. */
  readonly typed: string;
  /** As written in its place: `∀`. */
  readonly symbol: string;
}

/** All LaTeX spellings, sorted. */
export const latexSpellings: readonly Spelling[] = [...signs, ...relationSigns]
  .flatMap((sign) => sign.latex.map((typed) => ({ typed, symbol: sign.symbol })))
  .filter((spelling) => /^\\[a-z]/i.test(spelling.typed))
  .sort((a, b) => (a.typed < b.typed ? -1 : 1));
