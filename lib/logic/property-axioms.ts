/** The named properties that one sentence says, in groups. */
import { and, equal, exists, type Formula, forall, iff, implies, not, or, type Variable } from "./formula.ts";
import type { Relate } from "./properties.ts";

interface PropertyAxiom {
  readonly name: string;
  readonly synonyms: readonly string[];
  readonly meaning: string;
  readonly source: string;
  formulaOf(relate: Relate): Formula;
}

const [t, u, w, x, y, z] = ["t", "u", "w", "x", "y", "z"] as const;

function axiom(
  names: string,
  meaning: string,
  source: string,
  formulaOf: (R: Relate) => Formula,
): PropertyAxiom {
  const [name, ...synonyms] = names.split(" ");
  return { name: name!, synonyms, meaning, source, formulaOf };
}

/** Different elements. */
function differ(a: Variable, b: Variable): Formula {
  return not(equal(a, b));
}

/** Some element is related to both: they overlap, where the relation is parthood. */
function overlap(R: Relate, a: Variable, b: Variable): Formula {
  return exists(u, and(R(u, a), R(u, b)));
}

// The list, names and definitions of the first two groups follow Burghardt, "Simple Laws about Nonprominent
// Properties of Binary Relations" (2018), Definition 1.
const BURGHARDT = "Burghardt 2018";
const ORDERS = "Fishburn 1985";
const CHOICE = "Sen 1970";
const RELATIONS = "Schmidt and Ströhlein 1993";
const MODAL = "Blackburn, de Rijke and Venema 2001";
const LATTICES = "Davey and Priestley 2002";
const PARTHOOD = "Casati and Varzi 1999";
const GRAPHS = "Diestel 2017";

const pairs: readonly PropertyAxiom[] = [
  axiom("reflexive", "Every element is related to itself.", BURGHARDT, (R) => forall(x, R(x, x))),
  axiom("irreflexive", "No element is related to itself.", BURGHARDT, (R) => forall(x, not(R(x, x)))),
  axiom("coreflexive", "Elements are related to nothing but themselves.", BURGHARDT, (R) =>
    forall([x, y], implies(R(x, y), equal(x, y))),
  ),
  axiom("left-quasi-reflexive", "What is related to something is related to itself.", BURGHARDT, (R) =>
    forall([x, y], implies(R(x, y), R(x, x))),
  ),
  axiom(
    "right-quasi-reflexive shift-reflexive",
    "What something is related to is related to itself.",
    BURGHARDT,
    (R) => forall([x, y], implies(R(x, y), R(y, y))),
  ),
  axiom(
    "quasi-reflexive",
    "What is related to something, or something is related to, is related to itself.",
    BURGHARDT,
    (R) => forall([x, y], implies(R(x, y), and(R(x, x), R(y, y)))),
  ),
  axiom("symmetric", "The relation holds both ways if it holds one way.", BURGHARDT, (R) =>
    forall([x, y], implies(R(x, y), R(y, x))),
  ),
  axiom("asymmetric", "The relation never holds both ways.", BURGHARDT, (R) =>
    forall([x, y], implies(R(x, y), not(R(y, x)))),
  ),
  axiom("antisymmetric", "Different elements are never related both ways.", BURGHARDT, (R) =>
    forall([x, y], implies(and(R(x, y), R(y, x)), equal(x, y))),
  ),
  axiom("semi-connex semiconnex", "Of two different elements, one is related to the other.", BURGHARDT, (R) =>
    forall([x, y], or(R(x, y), R(y, x), equal(x, y))),
  ),
  axiom(
    "connex strongly-connex",
    "Of two elements, one is related to the other; each is related to itself.",
    BURGHARDT,
    (R) => forall([x, y], or(R(x, y), R(y, x))),
  ),
  axiom("right-serial serial left-total", "Every element is related to some element.", BURGHARDT, (R) =>
    forall(x, exists(y, R(x, y))),
  ),
  axiom("left-serial surjective right-total", "Each element has one that is related to it.", BURGHARDT, (R) =>
    forall(y, exists(x, R(x, y))),
  ),
  axiom("left-unique injective", "No two elements are related to the same one.", BURGHARDT, (R) =>
    forall([x, y, z], implies(and(R(x, z), R(y, z)), equal(x, y))),
  ),
  axiom(
    "right-unique functional univalent partial-function",
    "No element is related to two.",
    BURGHARDT,
    (R) => forall([x, y, z], implies(and(R(x, y), R(x, z)), equal(y, z))),
  ),
  axiom("empty", "No element is related to any.", RELATIONS, (R) => forall([x, y], not(R(x, y)))),
  axiom("universal", "Every element is related to every element.", RELATIONS, (R) => forall([x, y], R(x, y))),
];

const triples: readonly PropertyAxiom[] = [
  axiom("transitive", "Two steps of the relation can be made in one.", BURGHARDT, (R) =>
    forall([x, y, z], implies(and(R(x, y), R(y, z)), R(x, z))),
  ),
  axiom("antitransitive", "Two steps of the relation can never be made in one.", BURGHARDT, (R) =>
    forall([x, y, z], implies(and(R(x, y), R(y, z)), not(R(x, z)))),
  ),
  axiom(
    "quasi-transitive",
    "The strict part of the relation, where it holds one way alone, is transitive.",
    BURGHARDT,
    (R) =>
      forall(
        [x, y, z],
        implies(and(R(x, y), not(R(y, x)), R(y, z), not(R(z, y))), and(R(x, z), not(R(z, x)))),
      ),
  ),
  axiom(
    "right-euclidean euclidean",
    "What one element is related to is related among itself.",
    BURGHARDT,
    (R) => forall([x, y, z], implies(and(R(x, y), R(x, z)), R(y, z))),
  ),
  axiom("left-euclidean", "What is related to one element is related among itself.", BURGHARDT, (R) =>
    forall([x, y, z], implies(and(R(y, x), R(z, x)), R(y, z))),
  ),
  axiom(
    "semi-order-property-1",
    "Two steps that are joined by incomparable elements can be made in one.",
    BURGHARDT,
    (R) => forall([w, x, y, z], implies(and(R(w, x), not(R(x, y)), not(R(y, x)), R(y, z)), R(w, z))),
  ),
  axiom(
    "semi-order-property-2",
    "Every element is comparable with one of any three that make two steps.",
    BURGHARDT,
    (R) =>
      forall(
        [w, x, y, z],
        implies(and(R(x, y), R(y, z)), or(R(w, x), R(x, w), R(w, y), R(y, w), R(w, z), R(z, w))),
      ),
  ),
  axiom("dense", "Every step of the relation can be made in two.", BURGHARDT, (R) =>
    forall([x, z], implies(R(x, z), exists(y, and(R(x, y), R(y, z))))),
  ),
  axiom("incomparability-transitive", "Being related neither way is transitive.", BURGHARDT, (R) =>
    forall(
      [x, y, z],
      implies(and(not(R(x, y)), not(R(y, x)), not(R(y, z)), not(R(z, y))), and(not(R(x, z)), not(R(z, x)))),
    ),
  ),
  axiom("negatively-transitive cotransitive", "The complement of the relation is transitive.", ORDERS, (R) =>
    forall([x, y, z], implies(R(x, z), or(R(x, y), R(y, z)))),
  ),
  axiom(
    "ferrers biorder",
    "Of two steps from different elements, one can be made to where the other leads.",
    "Riguet 1951",
    (R) => forall([w, x, y, z], implies(and(R(w, x), R(y, z)), or(R(w, z), R(y, x)))),
  ),
  axiom(
    "semitransitive",
    "Two steps can be made by way of any element: it comes after the first or before the last.",
    ORDERS,
    (R) => forall([w, x, y, z], implies(and(R(x, y), R(y, z)), or(R(x, w), R(w, z)))),
  ),
  axiom("difunctional", "What has an image in common has all images in common.", "Riguet 1948", (R) =>
    forall([w, x, y, z], implies(and(R(w, x), R(y, x), R(y, z)), R(w, z))),
  ),
  axiom("circular", "Two steps of the relation lead back in one.", RELATIONS, (R) =>
    forall([x, y, z], implies(and(R(x, y), R(y, z)), R(z, x))),
  ),
];

const choice: readonly PropertyAxiom[] = [
  axiom(
    "indifference-transitive",
    "The symmetric part of the relation, where it holds both ways, is transitive (Sen's II).",
    CHOICE,
    (R) => forall([x, y, z], implies(and(R(x, y), R(y, x), R(y, z), R(z, y)), and(R(x, z), R(z, x)))),
  ),
  axiom(
    "pi-transitive",
    "A strict step, then one that holds both ways, make a strict step (Sen's PI).",
    CHOICE,
    (R) =>
      forall([x, y, z], implies(and(R(x, y), not(R(y, x)), R(y, z), R(z, y)), and(R(x, z), not(R(z, x))))),
  ),
  axiom(
    "ip-transitive",
    "A step that holds both ways, then a strict one, make a strict step (Sen's IP).",
    CHOICE,
    (R) =>
      forall([x, y, z], implies(and(R(x, y), R(y, x), R(y, z), not(R(z, y))), and(R(x, z), not(R(z, x))))),
  ),
];

const branching: readonly PropertyAxiom[] = [
  axiom(
    "confluent weakly-directed",
    "Any two elements that one is related to are related to a common one.",
    MODAL,
    (R) => forall([x, y, z], implies(and(R(x, y), R(x, z)), exists(w, and(R(y, w), R(z, w))))),
  ),
  axiom(
    "early-confluent",
    "Of any two elements that one is related to, one is related to the other.",
    "van Benthem 1983",
    (R) => forall([x, y, z], implies(and(R(x, y), R(x, z)), or(R(y, z), R(z, y)))),
  ),
  axiom(
    "non-branching-right piecewise-connected",
    "Of two different elements that one is related to, one is related to the other.",
    MODAL,
    (R) => forall([x, y, z], implies(and(R(x, y), R(x, z)), or(equal(y, z), R(y, z), R(z, y)))),
  ),
  axiom(
    "non-branching-left",
    "Of two different elements that are related to one, one is related to the other.",
    MODAL,
    (R) => forall([x, y, z], implies(and(R(y, x), R(z, x)), or(equal(y, z), R(y, z), R(z, y)))),
  ),
  axiom("up-directed", "Any two elements are related to a common one.", LATTICES, (R) =>
    forall([x, y], exists(z, and(R(x, z), R(y, z)))),
  ),
  axiom("down-directed", "Any two elements have one that is related to both.", LATTICES, (R) =>
    forall([x, y], exists(z, and(R(z, x), R(z, y)))),
  ),
  axiom("least-element", "There is one element that is related to all.", LATTICES, (R) =>
    exists(x, forall(y, R(x, y))),
  ),
  axiom(
    "greatest-element universe",
    "Every element is related to a certain one; of parthood, everything is part of it.",
    LATTICES,
    (R) => exists(x, forall(y, R(y, x))),
  ),
  axiom("binary-meets", "Any two elements have a greatest lower bound.", LATTICES, (R) =>
    forall([x, y], exists(z, and(R(z, x), R(z, y), forall(t, implies(and(R(t, x), R(t, y)), R(t, z)))))),
  ),
  axiom("binary-joins", "Any two elements have a least upper bound.", LATTICES, (R) =>
    forall([x, y], exists(z, and(R(x, z), R(y, z), forall(t, implies(and(R(x, t), R(y, t)), R(z, t)))))),
  ),
  axiom(
    "immediate-successors",
    "Every element is related to one with nothing in between.",
    "Rosenstein 1982",
    (R) => forall(x, exists(y, and(R(x, y), forall(z, not(and(R(x, z), R(z, y))))))),
  ),
  axiom(
    "immediate-predecessors",
    "To every element one is related with nothing in between.",
    "Rosenstein 1982",
    (R) => forall(x, exists(y, and(R(y, x), forall(z, not(and(R(y, z), R(z, x))))))),
  ),
  axiom(
    "n-free",
    "No four different elements are related as the letter N is drawn, and in no other way.",
    "Valdes, Tarjan and Lawler 1982",
    (R) =>
      forall(
        [w, x, y, z],
        not(
          and(
            differ(w, x),
            differ(w, y),
            differ(w, z),
            differ(x, y),
            differ(x, z),
            differ(y, z),
            R(w, y),
            R(x, y),
            R(x, z),
            not(R(w, x)),
            not(R(x, w)),
            not(R(y, z)),
            not(R(z, y)),
            not(R(w, z)),
            not(R(z, w)),
          ),
        ),
      ),
  ),
];

const parthood: readonly PropertyAxiom[] = [
  axiom(
    "weak-supplementation",
    "What has a proper part has a part that does not overlap it.",
    PARTHOOD,
    (R) =>
      forall([x, y], implies(and(R(x, y), differ(x, y)), exists(z, and(R(z, y), not(overlap(R, z, x)))))),
  ),
  axiom(
    "strong-supplementation",
    "What is no part of another has a part that does not overlap the other.",
    PARTHOOD,
    (R) => forall([x, y], implies(not(R(y, x)), exists(z, and(R(z, y), not(overlap(R, z, x)))))),
  ),
  axiom(
    "proper-part-extensionality",
    "Things with proper parts, and the same ones, are the same.",
    PARTHOOD,
    (R) =>
      forall(
        [x, y],
        implies(
          and(
            exists(z, and(R(z, x), differ(z, x))),
            forall(z, iff(and(R(z, x), differ(z, x)), and(R(z, y), differ(z, y)))),
          ),
          equal(x, y),
        ),
      ),
  ),
  axiom("overlap-extensionality", "Things that overlap the same things are the same.", PARTHOOD, (R) =>
    forall([x, y], implies(forall(z, iff(overlap(R, z, x), overlap(R, z, y))), equal(x, y))),
  ),
  axiom(
    "binary-products",
    "Any two things that overlap have a product, whose parts are their common parts.",
    PARTHOOD,
    (R) =>
      forall([x, y], implies(overlap(R, x, y), exists(z, forall(w, iff(R(w, z), and(R(w, x), R(w, y))))))),
  ),
  axiom(
    "binary-sums",
    "Any two things have a sum, which overlaps what overlaps one of them.",
    PARTHOOD,
    (R) =>
      forall([x, y], exists(z, forall(w, iff(overlap(R, w, z), or(overlap(R, w, x), overlap(R, w, y)))))),
  ),
  axiom("atomless", "Everything has a proper part.", PARTHOOD, (R) =>
    forall(x, exists(y, and(R(y, x), differ(y, x)))),
  ),
  axiom("atomistic", "Everything has a part without proper parts.", PARTHOOD, (R) =>
    forall(x, exists(y, and(R(y, x), forall(z, implies(R(z, y), equal(z, y)))))),
  ),
];

const sets: readonly PropertyAxiom[] = [
  axiom("extensional", "Elements to which the same ones are related are the same.", "Zermelo 1908", (R) =>
    forall([x, y], implies(forall(w, iff(R(w, x), R(w, y))), equal(x, y))),
  ),
  axiom("empty-set", "To some element none is related.", "Zermelo 1908", (R) =>
    exists(x, forall(y, not(R(y, x)))),
  ),
  axiom(
    "adjunction",
    "Related to some element is just what is related to a given one, and another given one.",
    "Tarski, Mostowski and Robinson 1953",
    (R) => forall([x, y], exists(z, forall(w, iff(R(w, z), or(R(w, x), equal(w, y)))))),
  ),
];

const graphs: readonly PropertyAxiom[] = [
  axiom("no-universal-point", "No point is joined to all others.", GRAPHS, (R) =>
    forall(x, exists(y, and(differ(x, y), not(R(x, y))))),
  ),
  axiom("diameter-2", "Any two different points are joined by one step or two.", GRAPHS, (R) =>
    forall([x, y], or(equal(x, y), R(x, y), exists(z, and(R(x, z), R(z, y))))),
  ),
  axiom(
    "no-alternating-4-cycle",
    "No four different points have two joined pairs that could be exchanged for unjoined ones.",
    "Chvátal and Hammer 1977",
    (R) =>
      forall(
        [w, x, y, z],
        not(
          and(
            differ(w, x),
            differ(w, y),
            differ(w, z),
            differ(x, y),
            differ(x, z),
            differ(y, z),
            R(w, x),
            R(y, z),
            not(R(w, y)),
            not(R(x, z)),
          ),
        ),
      ),
  ),
  axiom(
    "one-common-neighbour",
    "Any two different points have just one neighbour in common.",
    "Erdős, Rényi and Sós 1966",
    (R) =>
      forall(
        [x, y],
        implies(
          differ(x, y),
          exists(z, and(R(x, z), R(y, z), forall(t, implies(and(R(x, t), R(y, t)), equal(t, z))))),
        ),
      ),
  ),
];

export const propertyAxioms: readonly PropertyAxiom[] = [
  ...pairs,
  ...triples,
  ...choice,
  ...branching,
  ...parthood,
  ...sets,
  ...graphs,
];
