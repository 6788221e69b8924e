/**
 * Symbols of SMT-LIB 2.6 (Barrett, Fontaine and Tinelli 2021, section 3.1), and how names of cells become symbols
 * and symbols names again.
 *
 * Relations and the names of axioms are function symbols of one namespace, in which the symbols of the core theory
 * and the reserved words are taken too. A name that is taken gets an ending in brackets, which no name of a cell can
 * have: the relation `distinct` is `|distinct (relation)|`, the axiom `R` beside a relation `R` is `|R (axiom)|`.
 * Reading takes the ending off again.
 */
import { isSignWord, wordLength } from "./lexer.ts";
import { isVariable } from "./names.ts";

/** The characters of simple symbols. */
const SIMPLE = /^[A-Za-z~!@$%^&*_\-+=<>.?/][A-Za-z0-9~!@$%^&*_\-+=<>.?/]*$/;

/** Reserved words: as simple symbols they are none. Command names are reserved too. */
const RESERVED: ReadonlySet<string> = new Set(
  (
    "! _ as let exists forall match par BINARY DECIMAL HEXADECIMAL NUMERAL STRING assert check-sat " +
    "check-sat-assuming declare-const declare-datatype declare-datatypes declare-fun declare-sort define-fun " +
    "define-fun-rec define-funs-rec define-sort echo exit get-assertions get-assignment get-info get-model " +
    "get-option get-proof get-unsat-assumptions get-unsat-core get-value pop push reset reset-assertions set-info " +
    "set-logic set-option"
  ).split(" "),
);

/** Function symbols of the core theory, which cannot be declared again. */
const CORE: ReadonlySet<string> = new Set([
  "true",
  "false",
  "not",
  "=>",
  "and",
  "or",
  "xor",
  "=",
  "distinct",
  "ite",
]);

/** A symbol as it is written: simple, or between bars. */
export function writeSymbol(name: string): string {
  return SIMPLE.test(name) && !RESERVED.has(name) ? name : `|${name}|`;
}

/** Reserved words too: between bars they are symbols by the standard, and not for every reader of it. */
function isTaken(name: string): boolean {
  return CORE.has(name) || RESERVED.has(name);
}

const ENDING = / \((?:relation|axiom)\)$/;

/** The symbol of a relation. */
export function relationSymbol(name: string): string {
  return writeSymbol(isTaken(name) ? `${name} (relation)` : name);
}

/** The symbol that names an axiom, beside relations of those names. */
export function axiomSymbol(label: string, relations: ReadonlySet<string>): string {
  return writeSymbol(relations.has(label) || isTaken(label) ? `${label} (axiom)` : label);
}

/** The name that a symbol stands for, its ending taken off. */
export function nameOfSymbol(symbol: string): string {
  return symbol.replace(ENDING, "");
}

/**
 * The label that a symbol is read as: itself where it can be one, else with `-` for what cannot stand in a label.
 * @returns null when nothing of it can
 */
export function labelOfSymbol(symbol: string): string | null {
  const name = nameOfSymbol(symbol);
  if (isLabel(name)) return name;
  const words = name.match(/[\p{L}\p{Nd}_']+/gu) ?? [];
  const joined = words.join("-");
  const label = /^\p{L}/u.test(joined) ? joined : `a${joined}`;
  return words.length > 0 && isLabel(label) ? label : null;
}

function isLabel(text: string): boolean {
  return wordLength(text) === text.length && text.length > 0 && !isSignWord(text);
}

/** A variable of a cell for one of SMT-LIB: itself, or a letter of it, with a number when that is taken. */
export function variableOfSymbol(symbol: string, taken: (name: string) => boolean): string {
  if (isVariable(symbol)) {
    let name = symbol;
    while (taken(name)) name += "'";
    return name;
  }
  const letter = /[a-z]/.exec(symbol.toLowerCase())?.[0] ?? "x";
  let name = letter;
  for (let number = 1; taken(name); number += 1) name = `${letter}${number}`;
  return name;
}
