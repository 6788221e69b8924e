/**
 * Carriers made of others by their definition: true elements, with nothing cut, and what is true of them. None of the
 * program's own machinery is used, but for the last function, which says how a carrier writes true elements down.
 */
import type {
  CarrierAtom,
  CarrierDescription,
  CarrierFormula,
  ElementTerm,
} from "../../lib/logic/structure-definition.ts";

/** A number on a line, or the number of a point from 1; a tuple, an element of a part, an element of a copy. */
export type TrueElement =
  | number
  | { readonly tag: number; readonly coordinates: readonly TrueElement[] }
  | { readonly part: number; readonly element: TrueElement }
  | { readonly outer: TrueElement; readonly inner: TrueElement };

type Tuple = Extract<TrueElement, { readonly tag: number }>;
type OfPart = Extract<TrueElement, { readonly part: number }>;
type OfCopy = Extract<TrueElement, { readonly outer: TrueElement }>;

/** On a coloured line the whole numbers have colours in turn; all tests look at whole numbers alone. */
export function colourOf(value: number, colours: number): number {
  return ((value % colours) + colours) % colours;
}

/** All elements whose numbers on lines are among the given ones. */
export function elementsWith(
  description: CarrierDescription,
  numbers: readonly number[],
): readonly TrueElement[] {
  switch (description.kind) {
    case "points":
      return Array.from({ length: description.size }, (_, point) => point + 1);
    case "half-line":
      return numbers.filter((value) => value >= 0);
    case "integer-line":
    case "dense-line":
      return numbers;
    case "tuples": {
      const over = elementsWith(description.over, numbers);
      return description.widths.flatMap((width, tag) => {
        let tuples: TrueElement[][] = [[]];
        for (let i = 0; i < width; i += 1)
          tuples = tuples.flatMap((tuple) => over.map((one) => [...tuple, one]));
        return tuples.map((coordinates) => ({ tag, coordinates }));
      });
    }
    case "sum":
      return description.parts.flatMap((part, number) =>
        elementsWith(part, numbers).map((element) => ({ part: number, element })),
      );
    case "product":
      return elementsWith(description.outer, numbers).flatMap((outer) =>
        elementsWith(description.inner, numbers).map((inner) => ({ outer, inner })),
      );
    default:
      throw new Error(`no true elements of ${description.kind}`);
  }
}

/** What a term leads to: an element of some carrier, and a name of the very carrier, of all that the whole is made of. */
interface Found {
  readonly description: CarrierDescription;
  readonly within: string;
  readonly element: TrueElement;
}

function follow(
  path: readonly (number | "outer" | "inner")[],
  { description, within, element }: Found,
): Found | null {
  if (path.length === 0) return { description, within, element };
  const [step, ...rest] = path;
  switch (description.kind) {
    case "tuples": {
      const coordinate = (element as Tuple).coordinates[(step as number) - 1];
      if (coordinate === undefined) return null;
      return follow(rest, { description: description.over, within: `${within}/over`, element: coordinate });
    }
    case "product": {
      const { outer, inner } = element as OfCopy;
      return step === "outer"
        ? follow(rest, { description: description.outer, within: `${within}/outer`, element: outer })
        : follow(rest, {
            description: description.inner,
            within: `${within}/at ${JSON.stringify(outer)}`,
            element: inner,
          });
    }
    case "sum":
      return follow(path, inPart({ description, within, element }));
    default:
      return null;
  }
}

function inPart({ description, within, element }: Found): Found {
  if (description.kind !== "sum") return { description, within, element };
  const { part, element: inside } = element as OfPart;
  return inPart({ description: description.parts[part]!, within: `${within}/part ${part}`, element: inside });
}

/** Whether an atom is true of true elements. */
export function isAtomTrue(
  atom: CarrierAtom,
  description: CarrierDescription,
  named: (variable: string) => TrueElement,
): boolean {
  /** Null when there is no such component. */
  const find = (term: ElementTerm): Found | number | null => {
    if (term.kind === "number") return term.value;
    if (term.kind === "element")
      return follow(term.path, { description, within: "", element: named(term.variable) });
    throw new Error("no true element");
  };
  if (atom.kind === "label") {
    const found = find(atom.of) as Found | null;
    if (found === null) return false;
    if (atom.name === "part") return partNumber(found) === atom.value;
    const { description: of, element } = inPart(found);
    if (atom.name === "copy" && of.kind === "points") return element === atom.value;
    if (atom.name === "copy") return of.kind === "tuples" && (element as Tuple).tag === atom.value - 1;
    return of.kind === "dense-line" && colourOf(element as number, of.colours) === atom.value - 1;
  }
  if (atom.kind !== "compare") throw new Error("not of these carriers");
  const steps = (term: ElementTerm): readonly [ElementTerm, number] => {
    if (term.kind !== "shift") return [term, 0];
    const [inside, by] = steps(term.of);
    return [inside, by + term.by];
  };
  const [[leftTerm, leftBy], [rightTerm, rightBy]] = [steps(atom.left), steps(atom.right)];
  const [left, right] = [find(leftTerm), find(rightTerm)];
  if (left === null || right === null) return false;
  const isWhole = (one: Found | number) => typeof one !== "number" && typeof one.element === "object";
  const bothFound = typeof left !== "number" && typeof right !== "number";
  if (
    atom.relation === "=" &&
    leftBy === 0 &&
    rightBy === 0 &&
    bothFound &&
    (isWhole(left) || isWhole(right))
  )
    return JSON.stringify(left) === JSON.stringify(right);
  const places = [left, right].map((one) => (typeof one === "number" ? one : inPart(one)));
  const lines = places.filter((one) => typeof one !== "number") as Found[];
  if (lines.some(({ within }) => within !== lines[0]!.within)) return false;
  if (lines.some(({ element }) => typeof element !== "number")) return false;
  const { kind } = lines[0]!.description;
  const hasNumbers = lines.length < places.length;
  if (hasNumbers && kind !== "half-line" && kind !== "points") return false;
  if (leftBy + rightBy !== 0 && kind === "dense-line") return false;
  const [x, y] = places.map(
    (one, side) => (typeof one === "number" ? one : (one.element as number)) + [leftBy, rightBy][side]!,
  ) as [number, number];
  return atom.relation === "=" ? x === y : atom.relation === "<" ? x < y : x <= y;
}

/** The number, from 1, of the part that an element is in, those of parts that are sums counted too. */
function partNumber({ description, element, within }: Found): number {
  if (description.kind !== "sum") return 1;
  const count = (one: CarrierDescription): number =>
    one.kind === "sum" ? one.parts.reduce((sum, part) => sum + count(part), 0) : 1;
  const { part, element: inside } = element as OfPart;
  const before = description.parts.slice(0, part).reduce((sum, one) => sum + count(one), 0);
  return before + partNumber({ description: description.parts[part]!, element: inside, within });
}

/** Whether a formula is true of true elements. */
export function isFormulaTrue(
  formula: CarrierFormula,
  description: CarrierDescription,
  named: (variable: string) => TrueElement,
): boolean {
  const part = (inner: CarrierFormula) => isFormulaTrue(inner, description, named);
  switch (formula.kind) {
    case "true":
    case "false":
      return formula.kind === "true";
    case "not":
      return !part(formula.body);
    case "and":
      return formula.parts.every(part);
    case "or":
      return formula.parts.some(part);
    case "implies":
      return part(formula.left) ? part(formula.right) : true;
    case "iff":
      return Number(part(formula.left)) === Number(part(formula.right));
    default:
      return isAtomTrue(formula, description, named);
  }
}

/** What a table may tell of the elements, by definition: the same name for the same kind, and for no other. */
export function atomicName(description: CarrierDescription, elements: readonly TrueElement[]): string {
  switch (description.kind) {
    case "points":
      return elements.join();
    case "dense-line":
    case "integer-line":
    case "half-line": {
      const values = elements as readonly number[];
      const offset = description.kind === "dense-line" ? 0 : description.offset;
      const differences = values.flatMap((first, i) =>
        values.slice(i + 1).map((second) => {
          const difference = second - first;
          return Math.abs(difference) <= offset ? difference : difference > 0 ? ">" : "<";
        }),
      );
      const alone = values.map((value) =>
        description.kind === "dense-line"
          ? colourOf(value, description.colours)
          : description.kind === "half-line" && value < description.ends
            ? value
            : "-",
      );
      return `${alone.join()} ${differences.join()}`;
    }
    case "tuples": {
      const tuples = elements as readonly Tuple[];
      const coordinates = tuples.flatMap((one) => one.coordinates);
      return `${tuples.map(({ tag }) => tag).join()} (${atomicName(description.over, coordinates)})`;
    }
    case "sum": {
      const members = elements as readonly OfPart[];
      const names = description.parts.map((part, number) =>
        atomicName(
          part,
          members.filter((one) => one.part === number).map(({ element }) => element),
        ),
      );
      return `${members.map(({ part }) => part).join()} (${names.join(") (")})`;
    }
    case "product": {
      const members = elements as readonly OfCopy[];
      const outers = members.map(({ outer }) => outer);
      const copies = [...new Set(outers.map((outer) => JSON.stringify(outer)))];
      const names = copies.map((copy) =>
        atomicName(
          description.inner,
          members.filter(({ outer }) => JSON.stringify(outer) === copy).map(({ inner }) => inner),
        ),
      );
      return `(${atomicName(description.outer, outers)}) (${names.join(") (")})`;
    }
    default:
      throw new Error(`no true elements of ${description.kind}`);
  }
}

/**
 * Elements that, with so many quantifiers to come after the one that takes them, stand for all others. On lines they
 * reach three times as far as where nothing is told apart any more.
 */
export function windowOf(
  description: CarrierDescription,
  elements: readonly TrueElement[],
  toCome: number,
): readonly TrueElement[] {
  switch (description.kind) {
    case "points":
      return elementsWith(description, []);
    case "dense-line": {
      const sorted = [...new Set(elements as readonly number[])].sort((a, b) => a - b);
      if (sorted.length === 0) return somewhere(0, description.colours);
      const middles = sorted.slice(1).map((value, gap) => Math.floor((value + sorted[gap]!) / 2));
      const places = [sorted[0]! - VERY_FAR, ...middles, sorted.at(-1)! + VERY_FAR];
      return [...sorted, ...places.flatMap((place) => somewhere(place, description.colours))];
    }
    case "integer-line": {
      const values = elements as readonly number[];
      if (values.length === 0) return [0];
      const far = 3 * 2 ** toCome * (description.offset + 1);
      return whole(Math.min(...values) - far, Math.max(...values) + far);
    }
    case "half-line": {
      const far = 3 * 2 ** toCome * (description.offset + 1);
      return whole(0, Math.max(0, ...(elements as readonly number[])) + description.ends + far);
    }
    case "tuples": {
      const coordinates = (elements as readonly Tuple[]).flatMap((one) => one.coordinates);
      const widest = Math.max(...description.widths);
      return description.widths.flatMap((width, tag) => {
        let tuples: (readonly TrueElement[])[] = [[]];
        for (let left = width - 1; left >= 0; left -= 1)
          tuples = tuples.flatMap((tuple) =>
            windowOf(description.over, [...coordinates, ...tuple], toCome * widest + left).map((one) => [
              ...tuple,
              one,
            ]),
          );
        return tuples.map((tuple) => ({ tag, coordinates: tuple }));
      });
    }
    case "sum":
      return description.parts.flatMap((part, number) => {
        const inside = (elements as readonly OfPart[]).filter((one) => one.part === number);
        return windowOf(
          part,
          inside.map(({ element }) => element),
          toCome,
        ).map((element) => ({ part: number, element }));
      });
    case "product": {
      const members = elements as readonly OfCopy[];
      const outers = members.map(({ outer }) => outer);
      return windowOf(description.outer, outers, toCome).flatMap((outer) => {
        const inside = members.filter((one) => JSON.stringify(one.outer) === JSON.stringify(outer));
        return windowOf(
          description.inner,
          inside.map(({ inner }) => inner),
          toCome,
        ).map((inner) => ({ outer, inner }));
      });
    }
    default:
      throw new Error(`no true elements of ${description.kind}`);
  }
}

/** So far that a dozen halvings leave room. */
const VERY_FAR = 2 ** 20;

function somewhere(place: number, colours: number): readonly number[] {
  return whole(place, place + colours - 1);
}

function whole(first: number, last: number): number[] {
  return Array.from({ length: last - first + 1 }, (_, index) => first + index);
}

/** The configuration in which a carrier has true elements, as it writes it down. */
export function configurationOf(description: CarrierDescription, elements: readonly TrueElement[]): unknown {
  switch (description.kind) {
    case "points":
      return (elements as readonly number[]).map((point) => point - 1);
    case "integer-line":
    case "half-line":
      return { positions: elements };
    case "dense-line": {
      const values = elements as readonly number[];
      const sorted = [...new Set(values)].sort((a, b) => a - b);
      return {
        ranks: values.map((value) => sorted.indexOf(value)),
        colours: values.map((value) => colourOf(value, description.colours)),
      };
    }
    case "tuples": {
      const tuples = elements as readonly Tuple[];
      return {
        tags: tuples.map(({ tag }) => tag),
        base: configurationOf(
          description.over,
          tuples.flatMap((one) => one.coordinates),
        ),
      };
    }
    case "sum": {
      const members = elements as readonly OfPart[];
      const inside = description.parts.map((part, number) =>
        configurationOf(
          part,
          members.filter((one) => one.part === number).map(({ element }) => element),
        ),
      );
      return { parts: members.map(({ part }) => part), inside };
    }
    case "product": {
      const members = elements as readonly OfCopy[];
      const outers = members.map(({ outer }) => JSON.stringify(outer));
      const copies = [...new Set(outers)];
      return {
        groups: outers.map((outer) => copies.indexOf(outer)),
        outer: configurationOf(
          description.outer,
          copies.map((copy) => JSON.parse(copy) as TrueElement),
        ),
        inside: copies.map((copy) =>
          configurationOf(
            description.inner,
            members.filter((_, place) => outers[place] === copy).map(({ inner }) => inner),
          ),
        ),
      };
    }
    default:
      throw new Error(`no true elements of ${description.kind}`);
  }
}
