/** A run's records of how clauses came about, made into a refutation with all its terms. */
import type {
  AtomRecord,
  ClauseRecord,
  LiteralRecord,
  TermFormulaRecord,
  TermRecord,
  UseRecord,
} from "../../evidence/format.ts";
import type { Definition, Refutation, RefutationStep } from "../refutation.ts";
import type { CaseStep } from "./case-model.ts";
import type { ClauseStore } from "./clauses.ts";
import { type Draft, Rule } from "./draft.ts";
import type { ReadClause } from "./input.ts";
import { atomOf, isNegative, literalOf } from "./ordering.ts";
import { parentsOf } from "./simplify.ts";
import { canonical, partsOf, type Splitting } from "./splitting.ts";
import type { Substitution } from "./substitution.ts";
import { HEADER, IDENTITY, SHIFT, type TermBank, variable } from "./terms.ts";

/** In place of a step: the clause says of a ground literal that it is so if its name, the literal itself, holds. */
const NO_STEP = -1;

/** A clause of the run in the refutation: its step, and for each variable the name that it has there. */
interface Told {
  readonly step: number;
  readonly names: readonly string[];
}

/**
 * The refutation whose clause without literals is the last one stored, or the last step of `cases` if that has any. Uses
 * the draft and the substitution.
 */
export function replay(
  bank: TermBank,
  store: ClauseStore,
  draft: Draft,
  substitution: Substitution,
  splitting: Splitting,
  input: readonly ReadClause[],
  formulas: number,
  cases: readonly CaseStep[],
): Refutation {
  const needed = new Set<number>();
  const open = cases.length === 0 ? [store.count - 1] : cases.flatMap(({ clauses }) => clauses);
  for (let clause = open.pop(); clause !== undefined; clause = open.pop()) {
    if (needed.has(clause)) continue;
    needed.add(clause);
    open.push(...parentsOf(store.record(clause)));
  }
  const replayer = new Replayer(bank, store, draft, substitution, splitting, input, formulas);
  for (const clause of [...needed].sort((a, b) => a - b)) replayer.tell(clause);
  replayer.tellCases(cases);
  return { definitions: replayer.definitions, steps: replayer.steps };
}

class Replayer {
  readonly definitions: Definition[] = [];
  readonly steps: RefutationStep[] = [];
  readonly #bank: TermBank;
  readonly #store: ClauseStore;
  readonly #draft: Draft;
  readonly #substitution: Substitution;
  readonly #splitting: Splitting;
  readonly #input: readonly ReadClause[];
  readonly #formulas: number;
  readonly #told = new Map<number, Told>();
  /** Identity steps by the JSON text of their clauses. */
  readonly #identities = new Map<string, number>();
  /** By number of a name: its definition's. */
  readonly #definitions = new Map<number, number>();
  /** Definition steps by definition and place. */
  readonly #directions = new Map<string, number>();
  /** The step that the draft is in, and the names of its variables there. */
  #current: Told = { step: -1, names: [] };

  constructor(
    bank: TermBank,
    store: ClauseStore,
    draft: Draft,
    substitution: Substitution,
    splitting: Splitting,
    input: readonly ReadClause[],
    formulas: number,
  ) {
    this.#bank = bank;
    this.#store = store;
    this.#draft = draft;
    this.#substitution = substitution;
    this.#splitting = splitting;
    this.#input = input;
    this.#formulas = formulas;
  }

  /** Adds the steps of a clause whose parents have been told. */
  tell(clause: number): void {
    const record = this.#store.record(clause).slice();
    let at = this.#begin(record);
    while (at < record.length) at = this.#simplify(record, at);
    const { names } = this.#current;
    this.#draft.settle();
    const settled: string[] = [];
    names.forEach((name, v) => {
      const image = this.#substitution.instance(variable(v));
      settled[-1 - image] = name;
    });
    settled.length = this.#draft.variables;
    this.#told.set(clause, { step: this.#current.step, names: settled });
  }

  /** Adds the steps by which clauses of names, which have been told, contradict each other. */
  tellCases(cases: readonly CaseStep[]): void {
    const places: number[] = [];
    for (const { literals, clauses, steps } of cases) {
      const uses = [
        ...clauses.map((clause) => this.#told.get(clause)!.step),
        ...steps.map((k) => places[k]!),
      ];
      const clause = literals.map((literal) => this.#literalRecord(literal));
      this.steps.push({ from: "inference", clause, uses: uses.map((step): UseRecord => [step, {}]) });
      places.push(this.steps.length - 1);
    }
  }

  /** The first operation of a record; where the next one begins. */
  #begin(record: Int32Array): number {
    const draft = this.#draft;
    const [rule, a, b, c, d, e, f] = record as unknown as number[] & [number];
    switch (rule) {
      case Rule.input: {
        const { literals, names } = this.#input[a!]!;
        draft.input(a!, literals, names.length);
        this.steps.push({ from: "input", input: a! });
        this.#current = { step: this.steps.length - 1, names };
        if (draft.dropped.length > 0 || draft.turned.length > 0 || draft.length < literals.length)
          this.#emit([[this.#current.step, {}]], names);
        return 2;
      }
      case Rule.copy:
        draft.copy(a!);
        this.#current = this.#told.get(a!)!;
        return 2;
      case Rule.resolve:
        draft.setGiven(a!);
        this.#substitution.unify(atomOf(draft.given[b!]!), atomOf(this.#store.literal(c!, d!)));
        draft.resolve(a!, b!, c!, d!);
        this.#infer([this.#use(a!, SHIFT), this.#use(c!, 0)]);
        return 5;
      case Rule.factor:
        this.#substitution.unify(atomOf(this.#store.literal(a!, b!)), atomOf(this.#store.literal(a!, c!)));
        draft.factor(a!, b!, c!);
        this.#infer([this.#use(a!, 0)]);
        return 4;
      case Rule.superpose:
        this.#superpose(a!, b!, c!, d!, e!, f!, record[7] === 1);
        return 8;
      case Rule.reflect: {
        const [s, t] = this.#sides(this.#store.literal(a!, b!));
        this.#substitution.unify(s, t);
        draft.reflect(a!, b!);
        const term = this.#substitution.instance(s);
        this.#infer([this.#use(a!, 0), this.#reflexivity(this.#term(term))]);
        return 3;
      }
      case Rule.equate:
        this.#equate(a!, b!, c!, d!, e!);
        return 6;
      default: {
        const part = this.#splitting.named[a!]!;
        draft.define(a!, part, b === 0 ? 0 : 1);
        const step = part.variables === 0 ? NO_STEP : this.#direction(a!, b!);
        this.#current = { step, names: this.#allNames(part.variables) };
        return 3;
      }
    }
  }

  #superpose(
    from: number,
    equation: number,
    side: number,
    into: number,
    literal: number,
    place: number,
    fromIsGiven: boolean,
  ): void {
    const draft = this.#draft;
    draft.setGiven(fromIsGiven ? from : into);
    const atomOfFrom = atomOf(fromIsGiven ? draft.given[equation]! : this.#store.literal(from, equation));
    const target = fromIsGiven ? this.#store.literal(into, literal) : draft.given[literal]!;
    const left = this.#bank.words[atomOfFrom + HEADER + side]!;
    const path = pathTo(this.#bank, atomOf(target), place);
    this.#substitution.unify(left, subtermAt(this.#bank, atomOf(target), path));
    draft.superpose(from, equation, side, into, literal, place, fromIsGiven);
    const old = this.#substitution.instance(atomOf(target));
    const s = this.#substitution.instance(left);
    const t = this.#substitution.instance(this.#bank.words[atomOfFrom + HEADER + 1 - side]!);
    this.#infer([
      this.#use(from, fromIsGiven ? SHIFT : 0),
      this.#use(into, fromIsGiven ? 0 : SHIFT),
      this.#replacement(this.#literal(old, isNegative(target)), path, s, t, side === 0),
    ]);
  }

  #equate(clause: number, first: number, side: number, second: number, itsSide: number): void {
    const one = this.#store.literal(clause, first);
    const two = this.#store.literal(clause, second);
    const s = this.#sides(one);
    const u = this.#sides(two);
    this.#substitution.unify(s[side]!, u[itsSide]!);
    this.#draft.equate(clause, first, side, second, itsSide);
    const common = this.#term(this.#substitution.instance(s[side]!));
    const t = this.#term(this.#substitution.instance(s[1 - side]!));
    const v = this.#term(this.#substitution.instance(u[1 - itsSide]!));
    // With s = t and t = v, s = v: from the sides as they stand.
    const first1: AtomRecord = side === 0 ? ["=", "s", "t"] : ["=", "t", "s"];
    const second1: AtomRecord = itsSide === 0 ? ["=", "s", "v"] : ["=", "v", "s"];
    const identity = this.#identity([["not", ["=", "t", "v"]], ["not", first1], second1]);
    this.#infer([this.#use(clause, 0), [identity, { s: common, t, v }]]);
  }

  /** One simplification of the draft; where the next one begins. */
  #simplify(record: Int32Array, at: number): number {
    const draft = this.#draft;
    const { step, names } = this.#current;
    const target = draft.literals[record[at + 1]!]!;
    const unchanged = Object.fromEntries(names.map((name, v) => [name, nameOf(v)]));
    if (record[at] === Rule.eliminate) {
      draft.eliminate(record[at + 1]!);
      const image = Object.fromEntries(names.map((name, v) => [name, this.#term(draft.eliminated[v]!)]));
      const [s, t] = this.#sides(target);
      const put = draft.eliminated;
      const term = s < 0 ? put[-1 - s]! : put[-1 - t]!;
      this.#emit([[step, image], this.#reflexivity(this.#term(term))], this.#allNames());
      return at + 2;
    }
    if (record[at] === Rule.rewrite) {
      const [, , place, unit, side] = record.subarray(at) as unknown as [
        number,
        number,
        number,
        number,
        number,
      ];
      const sides = this.#sides(this.#store.literal(unit, 0));
      const path = pathTo(this.#bank, atomOf(target), place);
      const term = subtermAt(this.#bank, atomOf(target), path);
      this.#substitution.match(sides[side]!, term);
      const image = this.#substitution.image(sides[1 - side]!);
      const use = this.#imageUse(unit);
      this.#substitution.undo(0);
      draft.rewrite(record[at + 1]!, place, unit, side, image);
      this.#emit(
        [
          [step, unchanged],
          use,
          this.#replacement(this.#literalRecord(target), path, term, image, side === 0),
        ],
        this.#allNames(names.length),
      );
      return at + 5;
    }
    if (record[at] === Rule.name) {
      this.#name(record[at + 1]!, record[at + 2]!);
      return at + 3;
    }
    const unit = record[at + 2]!;
    const exchanged = record[at + 3] === 1;
    const atom = atomOf(target);
    const own = atomOf(this.#store.literal(unit, 0));
    const uses: UseRecord[] = [[step, unchanged]];
    if (exchanged) {
      const [s, t] = this.#sides(target);
      this.#substitution.match(this.#bank.words[own + HEADER]!, t);
      this.#substitution.match(this.#bank.words[own + HEADER + 1]!, s);
      // The literal holds if its parent's other literals do not; turned, it contradicts the unit clause.
      uses.push(
        isNegative(target)
          ? this.#symmetry(this.#term(t), this.#term(s))
          : this.#symmetry(this.#term(s), this.#term(t)),
      );
    } else this.#substitution.match(own, atom);
    uses.push(this.#imageUse(unit));
    this.#substitution.undo(0);
    draft.cut(record[at + 1]!, unit, exchanged);
    this.#emit(uses, this.#allNames(names.length));
    return at + 4;
  }

  /**
   * Puts a name for a part of the draft. A ground literal tells what it is by itself, and has no definition. Else, if the name did not hold, the part would be false of some elements, which the
   * definition's clauses have constants for: with them in place of the variables, the clause has only its rest.
   */
  #name(literal: number, name: number): void {
    const draft = this.#draft;
    const { step, names } = this.#current;
    const { places } = partsOf(this.#bank, draft.literals, draft.length).find((part) =>
      part.places.includes(literal),
    )!;
    const number = this.#splitting.numberOf(name);
    const { literals, variables } = this.#splitting.named[number]!;
    if (variables === 0) {
      draft.name(literal, name);
      return;
    }
    const { variables: order } = canonical(
      this.#bank,
      places.map((place) => draft.literals[place]!),
    );
    const formula = this.#formulas + this.#definition(number);
    const image = Object.fromEntries(
      names.map((own, v): [string, TermRecord] => {
        const place = order.indexOf(v);
        return [own, place < 0 ? nameOf(v) : [`${formula}.${place}`]];
      }),
    );
    const uses = literals.map((_, k): UseRecord => [this.#direction(number, k + 1), {}]);
    draft.name(literal, name);
    this.#emit([[step, image], ...uses], this.#allNames(names.length));
  }

  /** The definition of a name, which is made if there is none. */
  #definition(number: number): number {
    const known = this.#definitions.get(number);
    if (known !== undefined) return known;
    const { name, literals, variables } = this.#splitting.named[number]!;
    const records = literals.map((literal) => this.#literalRecord(literal));
    const disjunction: TermFormulaRecord = records.length === 1 ? records[0]! : ["or", ...records];
    const body = this.#allNames(variables)
      .slice(0, variables)
      .reduceRight<TermFormulaRecord>((inner, variable) => ["forall", variable, inner], disjunction);
    this.#definitions.set(number, this.definitions.length);
    return this.definitions.push({ name, parameters: [], body }) - 1;
  }

  /** A clause of the clause form of a definition: first ¬name ∨ part, then name ∨ ¬literal for each literal. */
  #direction(number: number, place: number): number {
    const definition = this.#definition(number);
    const key = `${definition} ${place}`;
    const known = this.#directions.get(key);
    if (known !== undefined) return known;
    this.#directions.set(key, this.steps.length);
    return this.steps.push({ from: "definition", definition, place }) - 1;
  }

  /** A clause whose variables are matched, as they are bound now. */
  #imageUse(clause: number): UseRecord {
    const { step, names } = this.#told.get(clause)!;
    return [
      step,
      Object.fromEntries(names.map((name, v) => [name, this.#term(this.#substitution.image(variable(v)))])),
    ];
  }

  /** A clause with what its variables are in the present instance. */
  #use(clause: number, shift: number): UseRecord {
    const { step, names } = this.#told.get(clause)!;
    return [
      step,
      Object.fromEntries(
        names.map((name, v) => [name, this.#term(this.#substitution.instance(variable(v + shift)))]),
      ),
    ];
  }

  /** Emits what the draft has become by an inference, and takes back the bindings. */
  #infer(uses: readonly UseRecord[]): void {
    this.#substitution.undo(0);
    this.#emit(uses, this.#allNames());
  }

  /** Names for the draft's variables, and for more that were there before. */
  #allNames(count = this.#draft.variables): string[] {
    return Array.from({ length: Math.max(count, this.#draft.variables) }, (_, v) => nameOf(v));
  }

  /** Adds the draft as a step that follows from others, and from identity where the draft was tidied by it. */
  #emit(uses: readonly UseRecord[], names: readonly string[]): void {
    const draft = this.#draft;
    const all = [...uses];
    const term = (t: number) => this.#term(t, names);
    for (const t of draft.dropped) all.push(this.#reflexivity(term(t)));
    for (let k = 0; k < draft.turned.length; k += 3) {
      const [s, t] = [term(draft.turned[k]!), term(draft.turned[k + 1]!)];
      all.push(draft.turned[k + 2] === 0 ? this.#symmetry(s, t) : this.#symmetry(t, s));
    }
    const clause: LiteralRecord[] = [];
    for (let k = 0; k < draft.length; k += 1) clause.push(this.#literalRecord(draft.literals[k]!, names));
    // A clause that is true anyway adds nothing.
    this.steps.push({ from: "inference", clause, uses: all.filter(([used]) => used !== NO_STEP) });
    this.#current = { step: this.steps.length - 1, names };
  }

  #reflexivity(term: TermRecord): UseRecord {
    return [this.#identity([["=", "u", "u"]]), { u: term }];
  }

  /** Of s = t: t = s. */
  #symmetry(s: TermRecord, t: TermRecord): UseRecord {
    return [
      this.#identity([
        ["not", ["=", "u", "v"]],
        ["=", "v", "u"],
      ]),
      { u: s, v: t },
    ];
  }

  /**
   * From a literal and s = t, or t = s, the literal with t for s where a path of arguments leads. All terms beside
   * the path are variables of the identity clause.
   */
  #replacement(
    literal: LiteralRecord,
    path: readonly number[],
    s: number,
    t: number,
    isForward: boolean,
  ): UseRecord {
    const negative = literal[0] === "not";
    const atom = negative ? literal[1] : (literal as AtomRecord);
    const values: Record<string, TermRecord> = { u: this.#term(s), v: this.#term(t) };
    let fresh = 0;
    const args = (atom[0] === "=" ? atom.slice(1) : atom.slice(2)) as TermRecord[];
    const pairs = args.map((arg, k) => abstract(arg, k === path[0] ? 1 : 0));
    const make = (side: 0 | 1) =>
      (atom[0] === "="
        ? ["=", ...pairs.map((pair) => pair[side])]
        : ["is", atom[1], ...pairs.map((pair) => pair[side])]) as AtomRecord;
    const equation: LiteralRecord = ["not", isForward ? ["=", "u", "v"] : ["=", "v", "u"]];
    const clause: ClauseRecord = negative
      ? [equation, make(0), ["not", make(1)]]
      : [equation, ["not", make(0)], make(1)];
    return [this.#identity(clause), values];

    /** A term before and after; `depth` is how much of the way leads to it, 0 if it is beside the way. */
    function abstract(term: TermRecord, depth: number): [TermRecord, TermRecord] {
      if (depth === path.length) return ["u", "v"];
      if (depth > 0) {
        const [name, ...inner] = term as readonly [string, ...TermRecord[]];
        const below = inner.map((arg, k) => abstract(arg, k === path[depth] ? depth + 1 : 0));
        return [
          [name, ...below.map(([before]) => before)],
          [name, ...below.map(([, after]) => after)],
        ];
      }
      const name = `w${fresh++}`;
      values[name] = term;
      return [name, name];
    }
  }

  #identity(clause: ClauseRecord): number {
    const key = JSON.stringify(clause);
    const known = this.#identities.get(key);
    if (known !== undefined) return known;
    this.steps.push({ from: "identity", clause });
    this.#identities.set(key, this.steps.length - 1);
    return this.steps.length - 1;
  }

  #sides(literal: number): [number, number] {
    const atom = atomOf(literal);
    return [this.#bank.words[atom + HEADER]!, this.#bank.words[atom + HEADER + 1]!];
  }

  #literalRecord(literal: number, names?: readonly string[]): LiteralRecord {
    return this.#literal(atomOf(literal), isNegative(literal), names);
  }

  #literal(atom: number, negative: boolean, names?: readonly string[]): LiteralRecord {
    const symbol = this.#bank.words[atom]!;
    if (this.#bank.isName[symbol]) {
      const { variables, literals } =
        this.#splitting.named[this.#splitting.numberOf(literalOf(atom, negative))]!;
      if (variables === 0) return this.#literal(atomOf(literals[0]!), negative);
    }
    const args = this.#arguments(atom, names);
    const record = (
      symbol === IDENTITY ? ["=", ...args] : ["is", this.#bank.names[symbol], ...args]
    ) as AtomRecord;
    return negative ? ["not", record] : record;
  }

  #term(term: number, names?: readonly string[]): TermRecord {
    if (term < 0) return names?.[-1 - term] ?? nameOf(-1 - term);
    return [this.#bank.names[this.#bank.words[term]!]!, ...this.#arguments(term, names)];
  }

  #arguments(term: number, names?: readonly string[]): TermRecord[] {
    const { words, arities } = this.#bank;
    return Array.from({ length: arities[words[term]!]! }, (_, k) =>
      this.#term(words[term + HEADER + k]!, names),
    );
  }
}

function nameOf(v: number): string {
  return `x${v}`;
}

/** The way to the subterm at a place, counted in reading order from 0: which argument to take each time. */
function pathTo(bank: TermBank, term: number, place: number): readonly number[] {
  let left = place;
  return find(term)!;

  function find(part: number): number[] | null {
    if (left === 0) return [];
    left -= 1;
    if (part < 0) return null;
    for (let k = 0; k < bank.arities[bank.words[part]!]!; k += 1) {
      const found = find(bank.words[part + HEADER + k]!);
      if (found !== null) return [k, ...found];
    }
    return null;
  }
}

function subtermAt(bank: TermBank, term: number, path: readonly number[]): number {
  return path.reduce((part, k) => bank.words[part + HEADER + k]!, term);
}
