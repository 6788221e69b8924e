/**
 * Laws of relation algebra, in the notation of the check values (`;` composition, `^` converse, `-` complement, `&`
 * meet, `|` join, `I` identity, `0` empty, `L` universal, `<=` inclusion), translated to sentences.
 */
import {
  and,
  atom,
  equal,
  exists,
  type Formula,
  falsum,
  forall,
  iff,
  implies,
  not,
  or,
  type Variable,
  verum,
} from "../../lib/logic/formula.ts";

/** A term, as the formula that says of two elements that it relates them. */
type Term = (x: Variable, y: Variable) => Formula;

let fresh = 0;

function relation(name: string): Term {
  return (x, y) => atom({ name, places: 2, infix: false }, x, y);
}

class Reader {
  readonly #tokens: string[];
  #next = 0;

  constructor(text: string) {
    this.#tokens = text.match(/[A-Z]|0|<=|[;^&|()=-]/g) ?? [];
    if (this.#tokens.join("") !== text.replace(/\s/g, "")) throw new Error(`cannot read ${text}`);
  }

  /** An equation or an inclusion, for all x and y. */
  comparison(): Formula {
    const left = this.#join();
    const sign = this.#take();
    const right = this.#join();
    if (this.#next !== this.#tokens.length || (sign !== "=" && sign !== "<="))
      throw new Error(`cannot read ${this.#tokens.join("")}`);
    const connect = sign === "=" ? iff : implies;
    return forall(["x", "y"], connect(left("x", "y"), right("x", "y")));
  }

  term(): Term {
    return this.#join();
  }

  #take(): string {
    return this.#tokens[this.#next++] ?? "";
  }

  #chain(sign: string, part: () => Term, connect: (a: Term, b: Term) => Term): Term {
    let left = part();
    while (this.#tokens[this.#next] === sign) {
      this.#next += 1;
      left = connect(left, part());
    }
    return left;
  }

  #join(): Term {
    return this.#chain(
      "|",
      () => this.#meet(),
      (a, b) => (x, y) => or(a(x, y), b(x, y)),
    );
  }

  #meet(): Term {
    return this.#chain(
      "&",
      () => this.#composition(),
      (a, b) => (x, y) => and(a(x, y), b(x, y)),
    );
  }

  #composition(): Term {
    return this.#chain(
      ";",
      () => this.#factor(),
      (a, b) => (x, y) => {
        const middle = `u${++fresh}`;
        return exists(middle, and(a(x, middle), b(middle, y)));
      },
    );
  }

  #factor(): Term {
    const token = this.#take();
    if (token === "-") {
      const inner = this.#factor();
      return (x, y) => not(inner(x, y));
    }
    let term: Term;
    if (token === "(") {
      term = this.#join();
      if (this.#take() !== ")") throw new Error("a bracket is missing");
    } else if (token === "I") term = equal;
    else if (token === "0") term = () => falsum;
    else if (token === "L") term = () => verum;
    else if (/[A-Z]/.test(token)) term = relation(token);
    else throw new Error(`cannot read ${token}`);
    while (this.#tokens[this.#next] === "^") {
      this.#next += 1;
      const inner = term;
      term = (x, y) => inner(y, x);
    }
    return term;
  }
}

/** Laws of the check values that are in words, written out. */
const IN_WORDS: Readonly<Record<string, string>> = {
  "P = -(R^;-R) satisfies I <= P and P;P <= P": "I <= -(R^;-R) and (-(R^;-R));(-(R^;-R)) <= -(R^;-R)",
  "R;(R\\S) <= S with R\\S = -(R^;-S)": "R;(-(R^;-S)) <= S",
  "R total and R^;R <= I implies R;-S = -(R;S)": "I <= R;R^ and R^;R <= I implies R;-S = -(R;S)",
  "R;-R^;R <= R implies the same for R^": "R;-R^;R <= R implies R^;-R;R^ <= R^",
  "for equivalences R,S: R;S is an equivalence iff R;S = S;R":
    "I <= R and R = R^ and R;R <= R and I <= S and S = S^ and S;S <= S implies [I <= R;S and R;S = (R;S)^ and (R;S);(R;S) <= R;S] iff [R;S = S;R]",
  "R,S symmetric imply R;S symmetric": "R = R^ and S = S^ implies R;S = (R;S)^",
  "R,S transitive imply R|S transitive": "R;R <= R and S;S <= S implies (R|S);(R|S) <= R|S",
  "R,S equivalences imply R;S equivalence":
    "I <= R and R = R^ and R;R <= R and I <= S and S = S^ and S;S <= S implies I <= R;S and R;S = (R;S)^ and (R;S);(R;S) <= R;S",
  "R|R^ = L and P;P <= P (P strict part) imply R;R <= R":
    "R|R^ = L and (R&-R^);(R&-R^) <= R&-R^ implies R;R <= R",
};

/** The sentence that a law says. */
export function lawSentence(law: string): Formula {
  return compound(IN_WORDS[law] ?? law);
}

function compound(text: string): Formula {
  const [condition, result] = text.split(/ impl(?:ies|y) /);
  if (result !== undefined) return implies(conjunction(condition!), sides(result));
  return sides(text);
}

function sides(text: string): Formula {
  const [left, right] = text.split(" iff ");
  return right === undefined ? conjunction(text) : iff(conjunction(left!), conjunction(right));
}

function conjunction(text: string): Formula {
  return and(
    ...text
      .replace(/[[\]]/g, "")
      .split(" and ")
      .map((part) => new Reader(part).comparison()),
  );
}
